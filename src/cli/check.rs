//! `check`: reads joint files and tells every fault at once.

use crate::{
    cli::{
        console::{Console, Layout, Outcome, Trouble},
        input::{self, Source},
    },
    diagnostic::{Colour, Fault},
    joint::{self, Faults, Joint},
    report::listing,
};
use clap::Args;
use std::{
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
}

impl Check {
    /// Checks every file, also after one at fault.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        input::stdin_at_most_once(&self.files)?;
        let layout = Layout::of_batch(self.files.len());
        let mut outcomes = Vec::new();
        for path in &self.files {
            outcomes.push(match read(path, &self.sets, console) {
                Ok((source, _)) if self.json => {
                    console.json(&listing::accepted(&source.name), layout)?;
                    Outcome::Done
                }
                Ok((source, joint)) => {
                    console.result(&accepted(&source.name, &joint))?;
                    Outcome::Done
                }
                Err(refused) if self.json => {
                    console.json(&refused.json(), layout)?;
                    Outcome::Faulty
                }
                Err(refused) => {
                    console.trouble(&refused.trouble());
                    Outcome::Faulty
                }
            });
        }
        Ok(Outcome::of_batch(&outcomes))
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

    /// The faults as JSON.
    pub fn json(&self) -> serde_json::Value {
        listing::faults(&self.name, &self.faults)
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

/// Reads one joint with its overrides.
pub fn read(
    path: &Path,
    sets: &[String],
    console: &mut Console,
) -> Result<(Source, Joint), Refused> {
    if input::waits_for_keyboard(path) {
        console.message("reading a joint from the keyboard; end it with Ctrl-D\n");
    }
    let source = input::read(path).map_err(|fault| Refused::unread(path, fault))?;
    let folder = input::folder(path);
    match joint::read_with_files(&source.text, sets, &|name| input::table(&folder, name)) {
        Ok(joint) => Ok((source, joint)),
        Err(mut faults) => {
            // The file names its tables from its own folder; a message names them from here.
            for (name, _) in faults.sources.iter_mut().skip(1 + sets.len()) {
                *name = input::name(&folder.join(&*name));
            }
            Err(Refused {
                name: source.name,
                faults,
            })
        }
    }
}

fn accepted(name: &str, joint: &Joint) -> String {
    let bolts = joint.bolts().count();
    let assumed = joint.assumptions.len();
    format!(
        "{name}: ok, {} plates, {bolts} bolt{}, {assumed} assumption{}\n",
        joint.plates.len(),
        if bolts == 1 { "" } else { "s" },
        if assumed == 1 { "" } else { "s" },
    )
}
