//! `check`: reads joint files and tells every fault at once.

use crate::{
    cli::{
        batch::Batch,
        console::{Console, Layout, Outcome, Trouble},
        input::{self, Source},
    },
    diagnostic::{Colour, Fault},
    joint::{self, Faults, Joint, Version},
    report::{listing, number::plain},
};
use clap::Args;
use std::{
    cell::RefCell,
    fmt::Write,
    path::{Path, PathBuf},
};

/// Read joint files and tell every fault, without computing anything
#[derive(Debug, Args)]
pub struct Check {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Print one JSON object per file
    #[arg(long)]
    json: bool,
    #[command(flatten)]
    batch: Batch,
}

impl Check {
    /// Checks every file, also after one at fault.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let files = self.batch.files(&self.files);
        input::stdin_at_most_once(&files)?;
        let layout = Layout::of_batch(self.files.len());
        self.batch
            .run(
                &files,
                console,
                &|_, path, console| match read_versions(path, &self.sets, console) {
                    Ok((source, _)) if self.json => {
                        console.json(&listing::accepted(&source.name), layout)?;
                        Ok(Outcome::Done)
                    }
                    Ok((source, versions)) => {
                        console.result(&accepted(&source.name, &versions))?;
                        Ok(Outcome::Done)
                    }
                    Err(refused) if self.json => {
                        console.json(&refused.json(), layout)?;
                        Ok(Outcome::Faulty)
                    }
                    Err(refused) => Err(refused.trouble()),
                },
            )
    }
}

/// A joint file that was not accepted.
pub struct Refused {
    name: String,
    faults: Faults,
}

impl Refused {
    /// A file that could not even be read.
    fn unread(path: &Path, fault: Fault) -> Self {
        Self {
            name: input::name(path),
            faults: Faults {
                sources: vec![(String::new(), String::new())],
                faults: vec![(0, fault)],
            },
        }
    }

    /// A file with faults, whose tables stand in its folder.
    fn of(source: Source, mut faults: Faults, (folder, sets): (&Path, &[String])) -> Self {
        // The file names its tables from its own folder; a message names them from here.
        for (name, _) in faults.sources.iter_mut().skip(1 + sets.len()) {
            *name = input::name(&folder.join(&*name));
        }
        Self {
            name: source.name,
            faults,
        }
    }

    /// The faults as JSON.
    pub fn json(&self) -> serde_json::Value {
        listing::faults(&self.name, &self.faults)
    }

    /// The first fault in one sentence.
    pub fn first(&self) -> String {
        let first = self.faults.faults.first();
        first.map_or_else(String::new, |(_, fault)| {
            format!("{}: {}", fault.code, fault.message)
        })
    }

    /// The faults drawn into the text they are in. Colour is always there; the console strips it.
    pub fn trouble(&self) -> Trouble {
        let mut text = self.faults.shown(&self.name, Colour::Ansi);
        text.push('\n');
        let count = self.faults.faults.len();
        if count > 1 {
            let _ = writeln!(text, "\n{count} faults in {}", self.name);
        }
        Trouble::Faults(text)
    }
}

/// Reads one joint with its overrides; variants of it are left aside, which is told.
pub fn read(
    path: &Path,
    sets: &[String],
    console: &mut Console,
) -> Result<(Source, Joint), Refused> {
    read_variant(path, (sets, None), console)
}

/// Reads one joint, or a variant of it by its name, with overrides.
pub fn read_variant(
    path: &Path,
    (sets, variant): (&[String], Option<&str>),
    console: &mut Console,
) -> Result<(Source, Joint), Refused> {
    let mut source = text(path, console)?;
    let names = joint::variant_names(&source.text);
    let place = match variant {
        None => {
            if !names.is_empty() {
                let count = names.len();
                console.message(&format!(
                    "{}: {count} variant{} left aside; ringsum compare reads them, --variant of estimate and report takes one\n",
                    source.name,
                    if count == 1 { "" } else { "s" },
                ));
            }
            None
        }
        Some(name) => Some(
            names
                .iter()
                .position(|known| known == name)
                .ok_or_else(|| Refused::unread(path, no_variant(name, (path, &names))))?,
        ),
    };
    let folder = input::folder(path);
    let tables = RefCell::new(Vec::new());
    let read = joint::read_version(&source.text, (sets, place), &|name| {
        tables.borrow_mut().push(folder.join(name));
        input::table(&folder, name)
    });
    match read {
        Ok(joint) => {
            source.tables = tables.into_inner();
            Ok((source, joint))
        }
        Err(faults) => Err(Refused::of(source, faults, (&folder, sets))),
    }
}

/// Reads one joint and all its variants, with overrides.
pub fn read_versions(
    path: &Path,
    sets: &[String],
    console: &mut Console,
) -> Result<(Source, Vec<Version>), Refused> {
    let source = text(path, console)?;
    let folder = input::folder(path);
    match joint::read_versions(&source.text, sets, &|name| input::table(&folder, name)) {
        Ok(versions) => Ok((source, versions)),
        Err(faults) => Err(Refused::of(source, faults, (&folder, sets))),
    }
}

fn text(path: &Path, console: &mut Console) -> Result<Source, Refused> {
    if input::waits_for_keyboard(path) {
        console.message("reading a joint from the keyboard; end it with Ctrl-D\n");
    }
    input::read(path).map_err(|fault| Refused::unread(path, fault))
}

/// A variant that the file does not have.
fn no_variant(name: &str, (path, names): (&Path, &[String])) -> Fault {
    let file = input::name(path);
    Fault {
        code: "name/unknown",
        message: format!("`{file}` has no variant `{}`", plain(name)),
        span: 0..0,
        expected: String::new(),
        help: Some(if names.is_empty() {
            "it has no variants: add a `[[variant]]` with its name".to_owned()
        } else {
            format!("its variants are {}", plain(&names.join(", ")))
        }),
    }
}

fn accepted(name: &str, versions: &[Version]) -> String {
    let Some(Version { joint, .. }) = versions.first() else {
        return String::new();
    };
    let several = |count: usize, what: &str| {
        let ending = if count == 1 { "" } else { "s" };
        format!("{count} {what}{ending}")
    };
    let mut parts = vec![
        format!("{} plates", joint.plates.len()),
        several(joint.bolts().count(), "bolt"),
        several(joint.assumptions.len(), "assumption"),
    ];
    if versions.len() > 1 {
        parts.push(several(versions.len() - 1, "variant"));
    }
    format!("{name}: ok, {}\n", parts.join(", "))
}
