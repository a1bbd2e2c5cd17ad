//! Codes of cautions, faults and laws, and the topics of the handbook, as text and as JSON.

use std::fmt::Write;

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    diagnostic::registry::{Entry, Gravity, Kind},
    report::{
        json::{HEAD, Head},
        number::wrapped,
        table::{Side, aligned},
        text::WIDTH,
    },
};

/// What `explain --json` prints without a code.
#[derive(Serialize, JsonSchema)]
pub(super) struct CodesTold {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// Every code and topic
    entries: Vec<CodeTold>,
}

/// What `explain --json` prints of a code.
#[derive(Serialize, JsonSchema)]
pub(super) struct CodeTold {
    /// Stable code, or name of a topic
    code: &'static str,
    /// What it is the code of
    #[schemars(extend("enum" = [
        "fault", "grave caution", "caution, out of range", "caution",
        "caution that goes with every estimate", "law", "topic"
    ]))]
    kind: &'static str,
    /// What it says in a few words
    title: &'static str,
    /// What it means
    meaning: &'static str,
    /// What to do about it
    remedy: &'static str,
    /// The law behind it; null where there is none
    law: Option<LawTold>,
}

/// A law of physics.
#[derive(Serialize, JsonSchema)]
struct LawTold {
    /// Its equation, with its symbols
    equation: &'static str,
    /// Where it holds
    range: &'static str,
    /// Where it is from
    source: &'static str,
}

/// Every entry, SI.
pub fn json(entries: &[Entry]) -> Value {
    json!(CodesTold {
        head: HEAD,
        entries: entries.iter().map(told).collect(),
    })
}

/// One entry.
pub fn entry_json(entry: &Entry) -> Value {
    json!(told(entry))
}

fn told(entry: &Entry) -> CodeTold {
    CodeTold {
        code: entry.code,
        kind: kind(entry.kind),
        title: entry.title,
        meaning: entry.meaning,
        remedy: entry.remedy,
        law: entry.law.map(|law| LawTold {
            equation: law.equation,
            range: law.range,
            source: law.source,
        }),
    }
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

/// Every code with its title.
pub fn index(entries: &[Entry]) -> String {
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

/// One entry in full.
pub fn page(entry: &Entry) -> String {
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
