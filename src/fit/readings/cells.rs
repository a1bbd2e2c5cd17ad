//! Lines and cells of a table, each with its place in the text.

use std::ops::Range;

/// Longest piece of a cell that a message repeats, characters.
const SHORT: usize = 40;

/// One cell.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Cell {
    /// What it says, without quotes and blanks around it.
    pub text: String,
    /// Its place.
    pub span: Range<usize>,
}

impl Cell {
    /// What it says, cut for a message.
    pub fn short(&self) -> String {
        let visible = self.text.chars().filter(|letter| !letter.is_control());
        let mut short: String = visible.take(SHORT).collect();
        if self.text.chars().count() > SHORT {
            short.push('…');
        }
        short
    }
}

/// One line that is neither empty nor a comment.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Line {
    /// Its number, from 1.
    pub number: usize,
    /// Its place.
    pub span: Range<usize>,
    /// Its cells.
    pub cells: Vec<Cell>,
    /// What separates them.
    pub separator: char,
}

/// The lines of a table: cells in quotes as RFC 4180 has them, `#` before a comment.
pub(super) fn lines(text: &str) -> Vec<Line> {
    let body = text.strip_prefix('\u{feff}').unwrap_or(text);
    let shift = text.len() - body.len();
    let separator = separator(body);
    let mut reader = csv::ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(separator as u8)
        .comment(Some(b'#'))
        .from_reader(body.as_bytes());
    let mut found = Vec::new();
    // Lines before a place that was counted up to.
    let mut counted = (0, 0);
    let mut record = csv::StringRecord::new();
    // Text is UTF-8 and rows may be of any length, so that no row can fail.
    while reader.read_record(&mut record).unwrap_or(false) {
        let Some(at) = record.position() else { break };
        let end = reader.position().byte() as usize;
        let start = content(body, at.byte() as usize);
        let raw = body.get(start..end).unwrap_or_default();
        let passed = body.get(counted.1..start).unwrap_or_default();
        counted = (counted.0 + passed.matches('\n').count(), start);
        let raw = raw.trim_end_matches(['\r', '\n']);
        if record.iter().all(|cell| cell.trim().is_empty()) {
            continue;
        }
        let places = places(raw, separator);
        let cells = record.iter().enumerate().map(|(index, cell)| {
            let place = places.get(index).cloned().unwrap_or(0..raw.len());
            Cell {
                text: cell.trim().trim_matches('"').trim().to_owned(),
                span: shift + start + place.start..shift + start + place.end,
            }
        });
        found.push(Line {
            number: counted.0 + 1,
            span: shift + start..shift + start + raw.len(),
            cells: cells.collect(),
            separator,
        });
    }
    found
}

/// Where the line begins once empty lines and comments before it are passed.
fn content(body: &str, mut start: usize) -> usize {
    while let Some(rest) = body.get(start..) {
        let line = rest.split_inclusive('\n').next().unwrap_or_default();
        if line.is_empty() || !(line.trim_matches(['\r', '\n']).is_empty() || line.starts_with('#'))
        {
            break;
        }
        start += line.len();
    }
    start
}

/// `;` or a tab where the heading has one, else `,`.
fn separator(body: &str) -> char {
    let heading = body
        .lines()
        .find(|line| !line.trim().is_empty() && !line.starts_with('#'))
        .unwrap_or_default();
    [';', '\t']
        .into_iter()
        .find(|sign| heading.contains(*sign))
        .unwrap_or(',')
}

/// The place of every cell of a line, blanks around it left out.
fn places(raw: &str, separator: char) -> Vec<Range<usize>> {
    let mut found = Vec::new();
    let (mut start, mut quoted) = (0, false);
    let ends = raw.char_indices().filter(|(_, letter)| {
        if *letter == '"' {
            quoted = !quoted;
        }
        *letter == separator && !quoted
    });
    let ends: Vec<usize> = ends.map(|(at, _)| at).chain([raw.len()]).collect();
    for end in ends {
        let cell = &raw[start..end];
        let from = start + (cell.len() - cell.trim_start().len());
        let length = cell.trim().len();
        found.push(from..from + length.max(usize::from(from < raw.len())));
        start = end + separator.len_utf8();
    }
    found
}
