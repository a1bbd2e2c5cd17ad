//! The layouts of a search as joint files of their own.

use super::Read;
use crate::{
    cli::{
        console::{Console, Trouble},
        output::Permit,
        results,
    },
    layout::{Answer, Fasten, Row, rewritten},
};
use std::{
    fs,
    path::{Path, PathBuf},
};

/// Where the layouts of the front are written.
pub struct Layouts<'a> {
    folder: PathBuf,
    permit: Permit<'a>,
    /// Whether their names begin with that of their joint, because several are searched.
    named: bool,
}

impl<'a> Layouts<'a> {
    /// The folder, made where there is none.
    pub fn new(folder: &Path, files: &[PathBuf], permit: Permit<'a>) -> Result<Self, Trouble> {
        if files.len() > 1 {
            results::apart(files, "-….toml")?;
        }
        results::make(folder)?;
        Ok(Self {
            folder: folder.to_owned(),
            permit,
            named: files.len() > 1,
        })
    }

    /// Refuses, before anything is searched, a joint whose tables its layouts would not find.
    pub fn check(&self, read: Read) -> Result<(), Trouble> {
        let plates = &read.joint.plates;
        let tables = plates.iter().any(|plate| plate.flatness_map.is_some());
        if tables && !same_folder(&self.folder, &read.source.folder) {
            return Err(Trouble::usage(
                "the joint names tables beside it, which its layouts would not find in another folder",
                "write into the folder of the joint file",
            ));
        }
        Ok(())
    }

    /// A joint file for each layout of the front.
    pub fn write(&self, read: Read, answer: &Answer, console: &mut Console) -> Result<(), Trouble> {
        let mut files = Vec::new();
        for row in answer.rows.iter().filter(|row| row.front) {
            let fasten = Fasten {
                size: row.size,
                places: &row.places,
            };
            let text = rewritten(&read.source.text, fasten)?;
            read.again(&text).map_err(|fault| {
                Trouble::Failure(format!("a layout makes a joint that cannot be: {fault}"))
            })?;
            let of = if self.named {
                format!("{}-", results::stem(Path::new(&read.source.name)))
            } else {
                String::new()
            };
            let path = self.folder.join(format!("{of}{}", name(row)));
            files.push((self.permit.target(&path)?, text));
        }
        for (target, text) in files {
            target.write(text.as_bytes())?;
            console.wrote(&target.path);
        }
        Ok(())
    }
}

/// `06-m5-edge.toml`.
fn name(row: &Row) -> String {
    let size = row
        .size
        .map_or_else(String::new, |size| format!("-size{}", size + 1));
    let thread: String = row
        .label
        .split(' ')
        .next()
        .unwrap_or("")
        .chars()
        .map(|letter| {
            if letter.is_ascii_alphanumeric() {
                letter.to_ascii_lowercase()
            } else {
                '_'
            }
        })
        .collect();
    format!(
        "{:02}-{thread}{size}-{}.toml",
        row.places.len(),
        row.family.name()
    )
}

fn same_folder(one: &Path, other: &Path) -> bool {
    let real = |path: &Path| {
        let path = if path == Path::new("") {
            Path::new(".")
        } else {
            path
        };
        fs::canonicalize(path).ok()
    };
    real(one).is_some() && real(one) == real(other)
}
