//! Measured points as a table of text: heading with quantities and units, one reading per line.

mod cells;
mod heading;

pub use heading::{Abscissa, Ordinate};

use crate::{
    diagnostic::Fault,
    fit::readings::{
        cells::{Line, lines},
        heading::{Column, Heading},
    },
};

/// Most faults told of one table.
const MOST_FAULTS: usize = 200;

/// Most readings of one table.
pub const MOST_READINGS: usize = 10_000;

/// A table that works.
pub(crate) const EXAMPLE: &str = "pressure [MPa], h [W/(m²·K)], sigma [%]";

/// Which way the load went.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Direction {
    /// Rising.
    Loading,
    /// Falling.
    Unloading,
}

impl Direction {
    /// As tables say it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Loading => "loading",
            Self::Unloading => "unloading",
        }
    }
}

/// One reading in SI.
#[derive(Clone, Debug, PartialEq)]
pub struct Reading {
    /// Its line in the table, from 1.
    pub line: usize,
    /// Pressure, force or torque; none where the table has no such column.
    pub abscissa: Option<f64>,
    /// Conductance, W/(m² K) or W/K.
    pub conductance: f64,
    /// Standard deviation over the value, 1.
    pub deviation: Option<f64>,
    /// Which way the load went, where stated.
    pub direction: Option<Direction>,
    /// Name of the specimen, where stated.
    pub specimen: Option<String>,
}

/// A table of readings.
#[derive(Clone, Debug, PartialEq)]
pub struct Readings {
    /// What was varied; none where nothing was.
    pub abscissa: Option<Abscissa>,
    /// What was measured, as the table states it.
    pub ordinate: Ordinate,
    /// The readings in file order.
    pub rows: Vec<Reading>,
}

impl Readings {
    /// Reads a table; on failure every fault found, in file order.
    pub fn read(text: &str) -> Result<Self, Vec<Fault>> {
        let mut faults = Vec::new();
        let lines = lines(text);
        let Some((first, rest)) = lines.split_first() else {
            return Err(vec![fault(
                "points/heading",
                0..0,
                "the table of points is empty",
                "expected a heading and readings",
            )]);
        };
        let heading = Heading::read(first, &mut faults);
        let Some(heading) = heading else {
            // Without units no row means anything.
            return Err(faults);
        };
        let mut rows = Vec::new();
        for line in rest {
            if faults.len() >= MOST_FAULTS {
                break;
            }
            rows.extend(row(line, &heading, &mut faults));
        }
        if faults.is_empty() && (rows.is_empty() || rows.len() > MOST_READINGS) {
            faults.push(fault(
                "points/too-few",
                first.span.clone(),
                &format!("the table has {} readings", rows.len()),
                &format!("expected from 1 to {MOST_READINGS}"),
            ));
        }
        if faults.is_empty() {
            Ok(Self {
                abscissa: heading.abscissa(),
                ordinate: heading.ordinate,
                rows,
            })
        } else {
            Err(faults)
        }
    }

    /// The readings of lines that are not left out; the lines that are no readings are given back.
    pub fn without(&self, lines: &[usize]) -> (Self, Vec<usize>) {
        let known = |line: &usize| self.rows.iter().any(|row| row.line == *line);
        let mut kept = self.clone();
        kept.rows.retain(|row| !lines.contains(&row.line));
        let strange = lines.iter().copied().filter(|line| !known(line)).collect();
        (kept, strange)
    }
}

/// One reading; none when a cell is at fault.
fn row(line: &Line, heading: &Heading, faults: &mut Vec<Fault>) -> Option<Reading> {
    let expected = heading.columns.len();
    if line.cells.len() != expected {
        let comma = heading.separator == ',' && line.cells.len() > expected;
        let mut told = fault(
            "points/row",
            line.span.clone(),
            &format!(
                "this line has {} cell{}",
                line.cells.len(),
                if line.cells.len() == 1 { "" } else { "s" }
            ),
            &format!("expected {expected}, as the heading has"),
        );
        told.help = Some(if comma {
            "write decimal points, `12.5`, or separate the cells by `;`".to_owned()
        } else {
            "one cell for each column of the heading; leave an optional one empty".to_owned()
        });
        faults.push(told);
        return None;
    }
    let before = faults.len();
    let mut found = Reading {
        line: line.number,
        abscissa: None,
        conductance: f64::NAN,
        deviation: None,
        direction: None,
        specimen: None,
    };
    let mut absolute = None;
    for (cell, column) in line.cells.iter().zip(&heading.columns) {
        match column {
            Column::Abscissa(_, unit) => {
                found.abscissa = positive(cell, *unit, faults);
            }
            Column::Ordinate(unit) => {
                let value = positive(cell, *unit, faults).unwrap_or(f64::NAN);
                found.conductance = if heading.ordinate.is_resistance() {
                    value.recip()
                } else {
                    value
                };
            }
            Column::Share(unit) => found.deviation = positive(cell, *unit, faults),
            Column::Absolute(unit) => absolute = positive(cell, *unit, faults),
            Column::Direction => found.direction = direction(cell, faults),
            Column::Specimen => {
                found.specimen = (!cell.text.is_empty()).then(|| cell.text.clone());
            }
        }
    }
    if let Some(absolute) = absolute {
        // A resistance and its inverse are off by the same share.
        let stated = if heading.ordinate.is_resistance() {
            found.conductance.recip()
        } else {
            found.conductance
        };
        found.deviation = Some(absolute / stated);
    }
    (faults.len() == before).then_some(found)
}

fn positive(cell: &cells::Cell, unit: f64, faults: &mut Vec<Fault>) -> Option<f64> {
    let text = cell.text.replace('−', "-");
    let number = text.parse::<f64>().ok().filter(|value| value.is_finite());
    let (message, help) = match number {
        Some(value) if value > 0.0 && (value * unit).is_normal() => return Some(value * unit),
        Some(_) => (
            format!("`{}` is not above zero", cell.short()),
            "leave out readings that mean nothing; a load of zero has no logarithm",
        ),
        None if text.is_empty() => (
            "this cell is empty".to_owned(),
            "leave out lines that were not measured",
        ),
        None if text.contains(',') => (
            format!("`{}` has a comma in its number", cell.short()),
            "write a decimal point: `12.5`",
        ),
        None => (
            format!("`{}` is not a number", cell.short()),
            "the unit stands in the heading: `12.5` below `pressure [MPa]`",
        ),
    };
    let mut told = fault(
        "points/row",
        cell.span.clone(),
        &message,
        "expected a finite number above zero",
    );
    told.help = Some(help.to_owned());
    faults.push(told);
    None
}

fn direction(cell: &cells::Cell, faults: &mut Vec<Fault>) -> Option<Direction> {
    match cell.text.to_lowercase().as_str() {
        "loading" | "up" => Some(Direction::Loading),
        "unloading" | "down" => Some(Direction::Unloading),
        _ => {
            faults.push(fault(
                "points/row",
                cell.span.clone(),
                &format!("`{}` is no direction of load", cell.short()),
                "expected `loading` or `unloading`",
            ));
            None
        }
    }
}

/// A fault whose help is the heading that works.
fn fault(code: &'static str, span: std::ops::Range<usize>, message: &str, expected: &str) -> Fault {
    Fault {
        code,
        message: message.to_owned(),
        span,
        expected: expected.to_owned(),
        help: Some(format!("for example `{EXAMPLE}`")),
    }
}

#[cfg(test)]
mod tests;
