//! Lists of things by name: catalogue records, codes, faults; as text and as JSON.

use crate::{
    joint::Faults,
    report::{
        json::{HEAD, Head},
        number::plain,
        table::{Side, aligned},
    },
};
use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};
use std::collections::BTreeMap;

/// One kind of catalogue record, ready to be filtered and shown.
#[derive(Clone, Debug, PartialEq)]
pub struct Listing {
    /// Kind, in the plural: `materials`.
    pub kind: &'static str,
    /// Headings with the unit and the side of each column.
    pub headings: Vec<(&'static str, Side)>,
    /// One item per record.
    pub items: Vec<Item>,
}

/// One record.
#[derive(Clone, Debug, PartialEq)]
pub struct Item {
    /// Cells in the order of the headings.
    pub cells: Vec<String>,
    /// Names a filter also looks at, with `|` between them, so that no match runs across two.
    pub keywords: String,
    /// The whole record in SI.
    pub record: Value,
}

impl Item {
    /// Whether every word occurs in this record; case, spaces and dashes do not matter.
    pub fn answers(&self, words: &[String]) -> bool {
        // No match may run from one cell into the next.
        let hay = folded(&format!("{}|{}", self.cells.join("|"), self.keywords));
        words.iter().all(|word| hay.contains(&folded(word)))
    }
}

/// Lower case without spaces and dashes: the form in which names are compared.
pub fn folded(text: &str) -> String {
    text.chars()
        .filter(|letter| !letter.is_whitespace() && !matches!(letter, '-' | '_'))
        .flat_map(char::to_lowercase)
        .collect()
}

/// The listing as a table under its kind.
pub fn text(listing: &Listing) -> String {
    let rows: Vec<Vec<String>> = listing
        .items
        .iter()
        .map(|item| item.cells.iter().map(|cell| lines(cell)).collect())
        .collect();
    let starred = rows.iter().flatten().any(|cell| cell.ends_with('*'));
    format!(
        "{} ({})\n{}{}",
        listing.kind,
        rows.len(),
        aligned(&listing.headings, &rows),
        if starred {
            "* from memory, not read in a source\n"
        } else {
            ""
        }
    )
}

/// A cell keeps its own line breaks.
fn lines(cell: &str) -> String {
    let lines: Vec<String> = cell.lines().map(plain).collect();
    lines.join("\n")
}

/// What `list --json` prints: records of the catalogue by kind.
#[derive(Serialize, JsonSchema)]
pub(super) struct Listed<'a> {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// Records by kind, each with the fields of its kind, SI
    #[schemars(with = "BTreeMap<String, Vec<serde_json::Map<String, Value>>>")]
    kinds: BTreeMap<&'static str, Vec<&'a Value>>,
}

/// The listings as one JSON object, records by kind.
pub fn json(listings: &[Listing]) -> Value {
    let kinds = listings.iter().map(|listing| {
        let records = listing.items.iter().map(|item| &item.record);
        (listing.kind, records.collect())
    });
    json!(Listed {
        head: HEAD,
        kinds: kinds.collect(),
    })
}

/// Whether a file was accepted, and its faults: what `check --json` prints of it, and every other command
/// of a file at fault.
#[derive(Serialize, JsonSchema)]
pub(super) struct Checked<'a> {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The file
    file: &'a str,
    /// Whether it has no faults
    ok: bool,
    /// Its faults, all at once
    faults: Vec<FaultTold<'a>>,
}

/// A fault and its place.
#[derive(Serialize, JsonSchema)]
struct FaultTold<'a> {
    /// Stable code, which `ringsum explain` explains
    code: &'static str,
    /// The file, or the override at fault
    file: &'a str,
    /// Line, counted from 1
    line: usize,
    /// Column in characters, counted from 1
    column: usize,
    /// What was found and what is expected
    message: &'a str,
    /// What the place should hold; empty where the message says it
    expected: &'a str,
    /// How to mend it; null where nothing more is to be said
    help: Option<&'a str>,
}

/// A joint that was read but has no answer.
#[derive(Serialize, JsonSchema)]
pub(super) struct Unanswered<'a> {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The joint file
    file: &'a str,
    /// There is no answer
    #[schemars(extend("const" = false))]
    ok: bool,
    /// Why, in a sentence
    failure: &'a str,
}

/// A joint that was read but has no answer, with the reason.
pub fn unanswered(file: &str, failure: &str) -> Value {
    json!(Unanswered {
        head: HEAD,
        file,
        ok: false,
        failure,
    })
}

/// A file without faults.
pub fn accepted(path: &str) -> Value {
    checked(path, Vec::new())
}

/// The faults of one file, with line and column counted from 1. A fault in an override names the
/// override as its file.
pub fn faults(path: &str, found: &Faults) -> Value {
    let told = found.faults.iter().map(|(source, fault)| {
        let (name, text) = &found.sources[*source];
        let (line, column) = place(text, fault.span.start);
        FaultTold {
            code: fault.code,
            file: if name.is_empty() { path } else { name },
            line,
            column,
            message: &fault.message,
            expected: &fault.expected,
            help: fault.help.as_deref(),
        }
    });
    checked(path, told.collect())
}

fn checked(file: &str, faults: Vec<FaultTold>) -> Value {
    json!(Checked {
        head: HEAD,
        file,
        ok: faults.is_empty(),
        faults,
    })
}

/// Line and column of a byte, both from 1; the column counts characters.
pub fn place(text: &str, byte: usize) -> (usize, usize) {
    let mut end = byte.min(text.len());
    while !text.is_char_boundary(end) {
        end -= 1;
    }
    let before = &text[..end];
    let line = before.matches('\n').count() + 1;
    let start = before.rfind('\n').map_or(0, |at| at + 1);
    (line, before[start..].chars().count() + 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_place_counts_lines_and_characters_from_one() {
        let text = "a = 1\nµ = \"2 µm\"\n";
        assert_eq!(place(text, 0), (1, 1));
        assert_eq!(place(text, text.find('=').unwrap()), (1, 3));
        assert_eq!(place(text, text.rfind('=').unwrap()), (2, 3));
        assert_eq!(place(text, 7), (2, 1), "inside the micro sign");
        assert_eq!(place(text, 999), (3, 1));
        assert_eq!(place("", 5), (1, 1));
    }

    #[test]
    fn a_filter_ignores_case_spaces_and_dashes() {
        let item = Item {
            cells: vec!["Al 6061-T6".to_owned()],
            keywords: "EN AW-6061 T6|6061".to_owned(),
            record: Value::Null,
        };
        assert!(item.answers(&["al6061 t6".to_owned()]));
        assert!(item.answers(&["AL".to_owned(), "aw".to_owned()]));
        assert!(!item.answers(&["AL".to_owned(), "7075".to_owned()]));
        assert!(!item.answers(&["T6 6061".to_owned()]), "across two names");
    }
}
