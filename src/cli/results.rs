//! A folder of results: one JSON for every joint file and one table of all.

use crate::{
    cli::{
        batch::Shard,
        console::Trouble,
        input,
        output::{self, Existing, Target},
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
    rows: Mutex<BTreeMap<usize, String>>,
}

impl Results {
    /// The files to write; the folder is made where there is none.
    pub fn new(
        (folder, columns): (&Path, &'static Table),
        files: &[PathBuf],
        (existing, part): (Existing, Option<Shard>),
    ) -> Result<Self, Trouble> {
        apart(files, ".json")?;
        make(folder)?;
        let name = columns.name;
        let table = match part {
            None => format!("{name}.csv"),
            Some(Shard { part, of }) => format!("{name}_{part}_of_{of}.csv"),
        };
        Ok(Self {
            targets: files
                .iter()
                .map(|path| Target::new(&folder.join(format!("{}.json", stem(path))), existing))
                .collect::<Result<Vec<Target>, Trouble>>()?,
            columns,
            table: Target::new(&folder.join(table), existing)?,
            rows: Mutex::new(BTreeMap::new()),
        })
    }

    /// Writes the result of one file, and keeps its rows of the table.
    pub fn put(
        &self,
        index: usize,
        object: &serde_json::Value,
        rows: String,
    ) -> Result<(), Trouble> {
        self.rows
            .lock()
            .unwrap_or_else(PoisonError::into_inner)
            .insert(index, rows);
        self.targets[index].write(format!("{object:#}\n").as_bytes())
    }

    /// Writes the table, in the order of the files; tells what was written.
    pub fn finish(&self) -> Result<String, Trouble> {
        let rows = self.rows.lock().unwrap_or_else(PoisonError::into_inner);
        let mut text = self.columns.header();
        text.extend(rows.values().map(String::as_str));
        self.table.write(text.as_bytes())?;
        Ok(format!(
            "wrote {} and {} JSON beside it\n",
            self.table.path.display(),
            rows.len()
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

/// Refuses a folder that is a file, or whose name is that of a figure.
pub fn folder(folder: &Path) -> Result<(), Trouble> {
    let shown = folder.display();
    if folder.is_dir() {
        return Ok(());
    }
    if folder.exists() {
        return Err(Trouble::usage(
            format!("`{shown}` is a file, where a folder is asked for"),
            "name a folder; it is made where there is none",
        ));
    }
    if output::format(folder).is_ok() {
        return Err(Trouble::usage(
            format!("`{shown}` is the name of a figure, where a folder is asked for"),
            "name a folder; its files are named by what they show",
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
