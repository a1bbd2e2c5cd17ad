//! The table of a flatness map as text: separators, header with units, rows of numbers.

use crate::{
    diagnostic::Fault,
    joint::{
        collector::{MOST_FAULTS, Wording, fault},
        maps::line_span,
        tree::{Span, short},
    },
    units::{self, Quantity},
};

/// Columns of the table.
const COLUMNS: [&str; 3] = ["x", "y", "z"];

/// A header that works.
const HEADER: &str = "x [mm], y [mm], z [µm]";

/// One point.
#[derive(Clone, Debug)]
pub(super) struct Row {
    /// x, y and height, m.
    pub point: [f64; 3],
    /// Its line.
    pub span: Span,
    /// Number of its line, from 1.
    pub line: usize,
}

/// The header: where the columns stand and what their units are.
struct Header {
    separator: char,
    /// Unit of each column of the file in m, and which of x, y, z it is.
    columns: [(usize, f64); 3],
}

/// Reads all rows that can be read and tells of the others.
pub(super) fn rows(text: &str, faults: &mut Vec<Fault>) -> Vec<Row> {
    let mut rows = Vec::new();
    let mut header = None;
    let mut start = 0;
    for (index, whole) in text.split('\n').enumerate() {
        let mut at = start;
        start += whole.len() + 1;
        let mut line = whole;
        if index == 0
            && let Some(rest) = line.strip_prefix('\u{feff}')
        {
            at += line.len() - rest.len();
            line = rest;
        }
        let said = line.trim();
        if said.is_empty() || said.starts_with('#') {
            continue;
        }
        if faults.len() >= MOST_FAULTS {
            break;
        }
        let Some(known) = &header else {
            match self::header(line, at) {
                Ok(read) => header = Some(read),
                Err(told) => {
                    // Without units no row means anything.
                    faults.push(*told);
                    return rows;
                }
            }
            continue;
        };
        match row(line, at, known) {
            Ok(point) => rows.push(Row {
                point,
                span: line_span(at, line),
                line: index + 1,
            }),
            Err(told) => faults.push(*told),
        }
    }
    if header.is_none() {
        faults.push(
            fault("map/header", &(0..0), "the table is empty")
                .expecting("expected a header and points")
                .help(format!("the header names columns and units: `{HEADER}`")),
        );
    }
    rows
}

fn header(line: &str, start: usize) -> Result<Header, Box<Fault>> {
    let wrong = |span: &Span, message: String, expected: &str| {
        Box::new(
            fault("map/header", span, message)
                .expecting(expected)
                .help(format!("the header names columns and units: `{HEADER}`")),
        )
    };
    let separator = if line.contains(';') { ';' } else { ',' };
    let cells: Vec<(&str, Span)> = cells(line, start, separator).collect();
    if cells.len() != COLUMNS.len() {
        return Err(wrong(
            &line_span(start, line),
            format!(
                "the header has {} column{}",
                cells.len(),
                if cells.len() == 1 { "" } else { "s" }
            ),
            "expected the three columns x, y and z",
        ));
    }
    let mut columns = [(0, 0.0); 3];
    let mut seen: Vec<usize> = Vec::new();
    for ((cell, span), column) in cells.iter().zip(&mut columns) {
        let bare = cell.trim_matches('"').trim();
        let (name, unit) = match bare.split_once(['[', '(']) {
            Some((name, unit)) => (name.trim(), unit.trim_end_matches([']', ')']).trim()),
            None => (bare, ""),
        };
        let known = COLUMNS
            .iter()
            .position(|known| name.eq_ignore_ascii_case(known));
        let Some(known) = known.filter(|known| !seen.contains(known)) else {
            return Err(wrong(
                span,
                format!("`{}` is not a column of a flatness map", short(cell)),
                "expected x, y and z, each once",
            ));
        };
        if unit.is_empty() {
            return Err(wrong(
                span,
                format!("the column `{name}` has no unit"),
                "expected a unit in brackets",
            ));
        }
        let size = units::parse(&format!("1 {unit}"), Quantity::Length).map_err(|unknown| {
            wrong(
                span,
                unknown.message,
                "expected a unit of length in brackets",
            )
        })?;
        seen.push(known);
        *column = (known, size);
    }
    Ok(Header { separator, columns })
}

fn row(line: &str, start: usize, header: &Header) -> Result<[f64; 3], Box<Fault>> {
    let cells: Vec<(&str, Span)> = cells(line, start, header.separator).collect();
    if cells.len() != COLUMNS.len() {
        return Err(Box::new(
            fault(
                "map/row",
                &line_span(start, line),
                format!(
                    "this line has {} value{}",
                    cells.len(),
                    if cells.len() == 1 { "" } else { "s" }
                ),
            )
            .expecting("expected three values")
            .help(format!(
                "values are separated by `{}` as in the header, with a decimal point: `12.5{0} 40{0} -3.2`",
                header.separator
            )),
        ));
    }
    let mut point = [0.0; 3];
    for ((cell, span), (axis, size)) in cells.iter().zip(&header.columns) {
        let number = cell.trim_matches('"').trim().replace('−', "-");
        let value = number.parse::<f64>().ok().filter(|value| value.is_finite());
        let Some(value) = value else {
            let help = if cell.contains(',') {
                "write a decimal point: `12.5`"
            } else {
                "leave out points that were not measured"
            };
            return Err(Box::new(
                fault(
                    "map/row",
                    span,
                    format!("`{}` is not a number", short(cell)),
                )
                .expecting("expected a finite number without unit")
                .help(help),
            ));
        };
        point[*axis] = value * size;
    }
    Ok(point)
}

/// The cells of a line, trimmed, each with its place.
fn cells(line: &str, start: usize, separator: char) -> impl Iterator<Item = (&str, Span)> {
    let mut at = start;
    line.split(separator).map(move |cell| {
        let span = line_span(at, cell);
        at += cell.len() + separator.len_utf8();
        (cell.trim(), span)
    })
}
