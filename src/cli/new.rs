//! `new`: a starter joint file that `estimate` accepts as it stands.

use crate::cli::{
    console::{Console, Outcome, Trouble},
    input,
    output::{Existing, Target},
};
use clap::Args;
use std::path::{Path, PathBuf};

/// The starter joint.
pub const TEMPLATE: &str = include_str!("template.toml");

/// Write a starter joint file, with comments
#[derive(Debug, Args)]
pub struct New {
    /// File to write; without one the joint is printed
    file: Option<PathBuf>,
    /// Replace the file if it exists
    #[arg(long)]
    force: bool,
}

impl New {
    /// Prints or writes the starter joint.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let Some(path) = self.file.filter(|path| path != Path::new("-")) else {
            console.result(TEMPLATE)?;
            return Ok(Outcome::Done);
        };
        Target::new(&path, Existing::from_force(self.force))?.write(TEMPLATE.as_bytes())?;
        let name = input::name(&path);
        console.message(&format!("wrote {name}; next: ringsum estimate {name}\n"));
        Ok(Outcome::Done)
    }
}
