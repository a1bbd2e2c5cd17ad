//! `explain`: what a code means and what to do about it, and the topics of the handbook.

use crate::{
    cli::{
        chain,
        console::{Console, Layout, Outcome, Trouble},
    },
    diagnostic::registry::{self, Entry, Gravity, Kind},
    report::{
        json::FORMAT,
        number::wrapped,
        table::{Side, aligned},
        text::WIDTH,
    },
};
use clap::Args;
use serde_json::{Value, json};
use std::fmt::Write;

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
        "kind": kind(entry.kind),
        "title": entry.title,
        "meaning": entry.meaning,
        "remedy": entry.remedy,
        "law": entry.law.map(|law| json!({
            "equation": law.equation, "range": law.range, "source": law.source,
        })),
    })
}

fn kind(kind: Kind) -> &'static str {
    match kind {
        Kind::Fault => "fault",
        Kind::Caution(Gravity::Grave) => "grave caution",
        Kind::Caution(Gravity::Range) => "caution, out of range",
        Kind::Caution(Gravity::Note) => "caution",
        Kind::Caution(Gravity::Standing) => "caution that goes with every estimate",
        Kind::Law => "law",
        Kind::Topic => "topic",
    }
}

fn index(entries: &[Entry]) -> String {
    let rows: Vec<Vec<String>> = entries
        .iter()
        .map(|entry| {
            vec![
                entry.code.to_owned(),
                kind(entry.kind).to_owned(),
                entry.title.to_owned(),
            ]
        })
        .collect();
    aligned(
        &[
            ("code", Side::Left),
            ("kind", Side::Left),
            ("title", Side::Left),
        ],
        &rows,
    )
}

fn page(entry: &Entry) -> String {
    let mut text = format!("{} ({}): {}\n", entry.code, kind(entry.kind), entry.title);
    for part in [entry.meaning, entry.remedy] {
        for paragraph in part.split("\n\n").filter(|part| !part.trim().is_empty()) {
            text.push('\n');
            text.push_str(&wrapped(paragraph, WIDTH, 0));
            text.push('\n');
        }
    }
    if let Some(law) = entry.law {
        text.push('\n');
        for (name, value) in [
            ("law", law.equation),
            ("range", law.range),
            ("source", law.source),
        ] {
            let body = wrapped(value, WIDTH - 8, 0).replace('\n', "\n        ");
            let _ = writeln!(text, "{name:<8}{body}");
        }
    }
    text
}
