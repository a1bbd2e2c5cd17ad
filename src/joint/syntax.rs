//! Faults of TOML itself, in words of this program.

use crate::{
    diagnostic::Fault,
    joint::{
        collector::{MOST_FAULTS, Wording, fault},
        tree::{Span, short},
    },
};

/// One fault for each line that TOML cannot read.
pub(super) fn faults(errors: &[toml::de::Error], text: &str) -> Vec<Fault> {
    let mut lines = Vec::new();
    let mut faults = Vec::new();
    for error in errors {
        let span = error.span().unwrap_or(text.len()..text.len());
        let span = span.start.min(text.len())..span.end.min(text.len());
        let line = line_of(text, &span);
        // One slip often breaks a line in several ways; the first is the one to mend.
        if lines.len() < MOST_FAULTS && !lines.contains(&line) {
            faults.push(worded(error.message(), &span, text));
            lines.push(line);
        }
    }
    faults
}

/// Removes faults that only follow from a line which TOML could not read.
pub(super) fn without_echoes(faults: Vec<Fault>, syntax: &[Fault], text: &str) -> Vec<Fault> {
    let lines: Vec<Span> = syntax
        .iter()
        .map(|fault| line_of(text, &fault.span))
        .collect();
    faults
        .into_iter()
        .filter(|fault| {
            // Overrides and tables stand behind the text.
            fault.span.start > text.len() || !lines.contains(&line_of(text, &fault.span))
        })
        .collect()
}

/// Whether TOML read on past every error with all values in place: only quotes were missing, or
/// a key stood twice. Then what the file says can be checked as well.
pub(super) fn all_recovered(errors: &[toml::de::Error]) -> bool {
    errors
        .iter()
        .all(|error| error.message().contains(UNQUOTED) || error.message() == DUPLICATE)
}

/// What TOML says of a text without quotes.
const UNQUOTED: &str = "must be quoted";

/// What TOML says of a key that stands twice.
const DUPLICATE: &str = "duplicate key";

/// Quotes that word processors put in place of straight ones.
const QUOTES: [char; 10] = ['“', '”', '„', '‟', '‘', '’', '‚', '«', '»', '″'];

fn worded(message: &str, span: &Span, text: &str) -> Fault {
    let found = text.get(span.clone()).unwrap_or_default();
    let bare = found.trim_matches(QUOTES);
    if message.contains(UNQUOTED) && !found.contains('\n') && bare != found {
        return fault(
            "file/syntax",
            span,
            format!("`{}` is in typographic quotes", short(found)),
        )
        .expecting(format!("expected `\"{}\"`", short(bare)))
        .help("text stands in straight quotes, as plain text editors write them");
    }
    if message.contains(UNQUOTED) && !found.contains('\n') {
        return fault(
            "file/syntax",
            span,
            format!("`{}` is not in quotes", short(found)),
        )
        .expecting(format!("expected `\"{}\"`", short(found)))
        .help("text, and every value with a unit, stands in quotes");
    }
    if message == DUPLICATE {
        return fault(
            "file/duplicate",
            span,
            format!("`{}` is stated twice", short(found)),
        )
        .expecting("stated before")
        .help("keep one of the two; tables that repeat have double brackets, `[[plate]]`");
    }
    let mut parts = message.splitn(2, ", expected ");
    let first = parts.next().unwrap_or(message);
    let label = parts.next().map(|rest| format!("expected {rest}"));
    fault("file/syntax", span, format!("not TOML: {first}"))
        .expecting(label.unwrap_or_else(|| "cannot be read".into()))
}

/// The line in which a span starts.
fn line_of(text: &str, span: &Span) -> Span {
    let bytes = text.as_bytes();
    let at = span.start.min(bytes.len());
    let start = bytes[..at]
        .iter()
        .rposition(|byte| *byte == b'\n')
        .map_or(0, |newline| newline + 1);
    let end = bytes[at..]
        .iter()
        .position(|byte| *byte == b'\n')
        .map_or(bytes.len(), |newline| at + newline);
    start..end
}
