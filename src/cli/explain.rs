//! `explain`: what a code means and what to do about it, and the topics of the handbook.

use crate::{
    cli::{
        chain,
        console::{Console, Layout, Outcome, Trouble},
    },
    diagnostic::registry,
    report::codes,
};
use clap::Args;

/// Explain a caution, a fault or a law by its code, or a topic such as joint-file
#[derive(Debug, Args)]
pub struct Explain {
    /// Code as printed, such as preload/over-yield, or a topic such as heat; without one all are
    /// listed
    code: Option<String>,
    /// Print JSON
    #[arg(long)]
    json: bool,
}

impl Explain {
    /// Explains one code or lists them all.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let entries = registry::entries();
        let Some(code) = self.code else {
            if self.json {
                console.json(&codes::json(entries), Layout::Indented)?;
            } else {
                console.result(&codes::index(entries))?;
            }
            return Ok(Outcome::Done);
        };
        let Some(found) = registry::entry(&code.trim().to_lowercase()) else {
            let known: Vec<String> = entries.iter().map(|entry| entry.code.to_owned()).collect();
            return Err(Trouble::usage(
                format!("there is no code `{code}`"),
                chain::nearest(&code, &known).map_or_else(
                    || "`ringsum explain` lists them all".to_owned(),
                    |near| format!("did you mean `{near}`?"),
                ),
            ));
        };
        if self.json {
            console.json(&codes::entry_json(found), Layout::Indented)?;
        } else {
            console.result(&codes::page(found))?;
        }
        Ok(Outcome::Done)
    }
}
