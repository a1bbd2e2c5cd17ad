//! A folder of results: one JSON for every joint file and one table of all.

use crate::{
    cli::{
        batch::Shard,
        console::Trouble,
        input,
        output::{self, Permit, Target},
    },
    report::csv::Table,
};
use std::{
    collections::BTreeMap,
    fs,
    path::{Path, PathBuf},
    sync::{Mutex, PoisonError},
};

/// Where the results of a batch go, checked before anything is computed.
#[derive(Debug)]
pub struct Results {
    targets: Vec<Target>,
    columns: &'static Table,
    table: Target,
    rows: Mutex<BTreeMap<usize, Row>>,
}

/// The lines of one file in the table, and whether its JSON was written.
#[derive(Debug)]
struct Row {
    lines: String,
    written: bool,
}

impl Results {
    /// The files to write for those of `given` that are this part's; the folder is made where there is none.
    pub fn new(
        (folder, columns): (&Path, &'static Table),
        (given, files): (&[PathBuf], &[PathBuf]),
        (permit, part): (Permit, Option<Shard>),
    ) -> Result<Self, Trouble> {
        apart(given, ".json")?;
        make(folder)?;
        let name = columns.name;
        let table = match part {
            None => format!("{name}.csv"),
            Some(Shard { part, of }) => format!("{name}_{part}_of_{of}.csv"),
        };
        Ok(Self {
            targets: files
                .iter()
                .map(|path| permit.target(&folder.join(format!("{}.json", stem(path)))))
                .collect::<Result<Vec<Target>, Trouble>>()?,
            columns,
            table: permit.target(&folder.join(table))?,
            rows: Mutex::new(BTreeMap::new()),
        })
    }

    /// Writes the result of one file, and keeps its lines of the table, also where it cannot be written.
    pub fn put(
        &self,
        index: usize,
        object: &serde_json::Value,
        lines: String,
    ) -> Result<(), Trouble> {
        let written = self.targets[index].write(format!("{object:#}\n").as_bytes());
        let row = Row {
            lines,
            written: written.is_ok(),
        };
        self.rows
            .lock()
            .unwrap_or_else(PoisonError::into_inner)
            .insert(index, row);
        written
    }

    /// Writes the table, in the order of the files; tells what was written.
    pub fn finish(&self) -> Result<String, Trouble> {
        let rows = self.rows.lock().unwrap_or_else(PoisonError::into_inner);
        let mut text = self.columns.header();
        text.extend(rows.values().map(|row| row.lines.as_str()));
        self.table.write(text.as_bytes())?;
        Ok(format!(
            "wrote {} and {} JSON beside it\n",
            self.table.path.display(),
            rows.values().filter(|row| row.written).count()
        ))
    }
}

/// Refuses files whose results would bear the same name.
pub fn apart(files: &[PathBuf], ending: &str) -> Result<(), Trouble> {
    let mut known: BTreeMap<String, &PathBuf> = BTreeMap::new();
    for path in files {
        // Names that differ in case alone are one file on some systems.
        if let Some(other) = known.insert(stem(path).to_lowercase(), path) {
            return Err(Trouble::usage(
                format!(
                    "`{}` and `{}` would both be written to `{}{ending}`",
                    other.display(),
                    path.display(),
                    stem(path)
                ),
                "write them to folders of their own",
            ));
        }
    }
    Ok(())
}

/// Endings of what may be handed over: a new folder that ends so is a slip.
const FILES: [&str; 9] = [
    "svg", "png", "pdf", "html", "htm", "json", "csv", "toml", "txt",
];

/// Whether a path ends like a file.
pub fn ends_like_a_file(path: &Path) -> bool {
    let ending = path.extension().and_then(|ending| ending.to_str());
    ending.is_some_and(|ending| FILES.iter().any(|file| ending.eq_ignore_ascii_case(file)))
}

/// Refuses a folder that is a file, lies in one, or is not there and ends like a file.
pub fn folder(folder: &Path) -> Result<(), Trouble> {
    let shown = folder.display();
    if folder.is_dir() {
        return Ok(());
    }
    if let Some(file) = folder.ancestors().find(|part| part.is_file()) {
        return Err(Trouble::usage(
            if file == folder {
                format!("`{shown}` is a file, where a folder is asked for")
            } else {
                format!("`{}` is a file, and no folder lies in it", file.display())
            },
            "name a folder; it is made where there is none",
        ));
    }
    if ends_like_a_file(folder) {
        return Err(Trouble::usage(
            format!("`{shown}` is the name of a file, where a folder is asked for"),
            if output::format(folder).is_ok() {
                "name a folder; a command that draws one figure takes its name by --draw FIGURE"
            } else {
                "name a folder; its files are named by what they hold"
            },
        ));
    }
    Ok(())
}

/// Makes a folder where there is none.
pub fn make(folder: &Path) -> Result<(), Trouble> {
    self::folder(folder)?;
    fs::create_dir_all(folder).map_err(|found| {
        Trouble::Failure(format!(
            "the folder `{}` cannot be made: {found}",
            folder.display()
        ))
    })
}

/// Name of a joint file without folder and ending.
pub fn stem(path: &Path) -> String {
    if path == Path::new("-") {
        return "stdin".to_owned();
    }
    path.file_stem().map_or_else(
        || input::name(path),
        |stem| stem.to_string_lossy().into_owned(),
    )
}
