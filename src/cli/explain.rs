//! `explain`: what a code means and what to do about it.

use crate::{
    cli::{
        chain::{self, Entry},
        console::{Console, Layout, Outcome, Trouble},
    },
    report::{
        json::FORMAT,
        number::wrapped,
        table::{Side, aligned},
        text::WIDTH,
    },
};
use clap::Args;
use serde_json::{Value, json};

/// Explain a caution, a fault or a law by its code
#[derive(Debug, Args)]
pub struct Explain {
    /// Code as printed, such as preload/over-yield; without one all are listed
    code: Option<String>,
    /// Print JSON
    #[arg(long)]
    json: bool,
}

impl Explain {
    /// Explains one code or lists them all.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let entries = chain::entries();
        let Some(code) = self.code else {
            if self.json {
                let list: Vec<Value> = entries.iter().map(entry).collect();
                let object = json!({
                    "ringsum": env!("CARGO_PKG_VERSION"), "format": FORMAT, "entries": list,
                });
                console.json(&object, Layout::Indented)?;
            } else {
                console.result(&index(entries))?;
            }
            return Ok(Outcome::Done);
        };
        let Some(found) = entries
            .iter()
            .find(|entry| entry.code.eq_ignore_ascii_case(code.trim()))
        else {
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
            console.json(&entry(found), Layout::Indented)?;
        } else {
            console.result(&page(found))?;
        }
        Ok(Outcome::Done)
    }
}

fn entry(entry: &Entry) -> Value {
    json!({
        "code": entry.code,
        "title": entry.title,
        "meaning": entry.meaning,
        "remedy": entry.remedy,
    })
}

fn index(entries: &[Entry]) -> String {
    let rows: Vec<Vec<String>> = entries
        .iter()
        .map(|entry| vec![entry.code.to_owned(), entry.title.to_owned()])
        .collect();
    aligned(&[("code", Side::Left), ("title", Side::Left)], &rows)
}

fn page(entry: &Entry) -> String {
    let mut text = format!("{}: {}\n", entry.code, entry.title);
    for part in [entry.meaning, entry.remedy] {
        for paragraph in part.split("\n\n").filter(|part| !part.trim().is_empty()) {
            text.push('\n');
            text.push_str(&wrapped(paragraph, WIDTH, 0));
            text.push('\n');
        }
    }
    text
}
