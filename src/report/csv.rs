//! Results as rows of one table, for spreadsheets: SI, unrounded, comma separated (RFC 4180).

mod drivers;
mod layouts;
mod maps;
mod torques;

pub use drivers::{DRIVERS, drivers};
pub use layouts::{LAYOUTS, layouts};
pub use maps::{Condition, map, nodes};
pub use torques::{TORQUES, torques};

use crate::{
    estimate::{Band, CaseResult, Estimate, Met},
    joint::Mass,
};

/// A table of many joints; every row begins with file, outcome and message.
#[derive(Debug)]
pub struct Table {
    /// Name of its file without the ending.
    pub name: &'static str,
    /// The further columns; values in SI.
    pub columns: &'static [&'static str],
}

/// What every row begins with.
const FIRST: [&str; 3] = ["file", "outcome", "message"];

impl Table {
    /// The line that names the columns.
    pub fn header(&self) -> String {
        let names = FIRST.iter().chain(self.columns);
        line(&names.map(|name| (*name).to_owned()).collect::<Vec<_>>())
    }

    /// The line of a file without an answer.
    pub fn without(&self, file: &str, ended: Ended, message: &str) -> String {
        let mut cells = vec![file.to_owned(), ended.word().to_owned(), message.to_owned()];
        cells.resize(FIRST.len() + self.columns.len(), String::new());
        line(&cells)
    }

    /// Lines of an answer with the file that they belong to; an answer without lines has one that says
    /// so.
    pub fn of_file(&self, file: &str, ended: Ended, rows: &[Vec<String>]) -> String {
        if rows.is_empty() {
            let ended = match ended {
                Ended::Done => Ended::Empty,
                other => other,
            };
            return self.without(file, ended, "nothing was found");
        }
        let first = [file.to_owned(), ended.word().to_owned(), String::new()];
        rows.iter()
            .map(|row| line(&[&first, row.as_slice()].concat()))
            .collect()
    }
}

/// One row for every case of every joint.
pub const ESTIMATES: Table = Table {
    name: "estimates",
    columns: &[
        "title",
        "field",
        "resolution",
        "draws",
        "case",
        "contact_K_per_W_low",
        "contact_K_per_W",
        "contact_K_per_W_high",
        "node_to_node_K_per_W_low",
        "node_to_node_K_per_W",
        "node_to_node_K_per_W_high",
        "added_by_joint_K_per_W_low",
        "added_by_joint_K_per_W",
        "added_by_joint_K_per_W_high",
        "source_to_sink_K_per_W_low",
        "source_to_sink_K_per_W",
        "source_to_sink_K_per_W_high",
        "numerical_error",
        "rise_K_low",
        "rise_K",
        "rise_K_high",
        "hottest_K",
        "requirement",
        "bolts",
        "strength_use",
        "strength_use_high",
        "mass_fasteners_kg",
        "mass_plates_kg",
        "gap_max_m",
        "peak_pressure_Pa",
        "cautions",
    ],
};

/// How a file ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ended {
    /// With an answer.
    Done,
    /// With an answer that has no line.
    Empty,
    /// Stopped by the user, with what was found so far.
    Interrupted,
    /// The file is at fault.
    Faulty,
    /// The chain gave no number.
    Failed,
}

impl Ended {
    fn word(self) -> &'static str {
        match self {
            Self::Done => "done",
            Self::Empty => "empty",
            Self::Interrupted => "interrupted",
            Self::Faulty => "faulty",
            Self::Failed => "failed",
        }
    }
}

/// The cells of every case of an estimate.
pub fn estimates(estimate: &Estimate, mass: &Mass) -> Vec<Vec<String>> {
    let requirement = estimate.requirement().map(|(_, result)| match result.met {
        Met::Yes if estimate.met_of_heat_alone().is_some() => "met of heat alone",
        Met::Yes => "met",
        Met::Uncertain => "uncertain",
        Met::No => "not met",
    });
    let codes: Vec<&str> = estimate.cautions.iter().map(|each| each.code).collect();
    let case = |case: &CaseResult| {
        let mut cells = vec![
            estimate.title.clone(),
            estimate.field.to_owned(),
            estimate.resolution.to_owned(),
            estimate.draws.to_string(),
            case.name.to_owned(),
        ];
        let results = &case.results;
        for plane in [
            results.contact,
            results.node_to_node,
            results.added_by_joint,
            results.source_to_sink,
        ] {
            cells.extend(band(Some(&plane.resistance)));
        }
        cells.push(case.numerical_error.to_string());
        cells.extend(band(case.rise.as_ref().map(|rise| &rise.source)));
        cells.push(number(case.rise.map(|rise| rise.hottest.nominal)));
        cells.push(requirement.unwrap_or("").to_owned());
        let clamping = case.bolts.iter().filter(|bolt| !bolt.missing);
        cells.push(clamping.count().to_string());
        let most = |which: usize| {
            let uses = case.bolts.iter().filter_map(|bolt| bolt.strength_use);
            uses.map(|each| each[which]).reduce(f64::max)
        };
        cells.extend([number(most(0)), number(most(1))]);
        cells.extend([mass.fasteners.to_string(), mass.plates.to_string()]);
        cells.push(number(case.pressure.gap_max));
        cells.push(case.pressure.peak.to_string());
        cells.push(codes.join(" "));
        cells
    };
    estimate.cases.iter().map(case).collect()
}

fn band(band: Option<&Band>) -> [String; 3] {
    [
        number(band.and_then(|band| band.low)),
        number(band.map(|band| band.nominal)),
        number(band.and_then(|band| band.high)),
    ]
}

fn number(value: Option<f64>) -> String {
    let finite = value.filter(|value| value.is_finite());
    finite.map_or_else(String::new, |value| value.to_string())
}

fn line(cells: &[String]) -> String {
    let cells: Vec<String> = cells.iter().map(|cell| quoted(cell)).collect();
    format!("{}\n", cells.join(","))
}

/// A cell, in quotes where it holds what parts cells; a spreadsheet must not take it for a formula.
fn quoted(cell: &str) -> String {
    let is_number = cell.parse::<f64>().is_ok();
    let formula = !is_number && cell.starts_with(['=', '+', '-', '@']);
    let cell = if formula {
        format!("'{cell}")
    } else {
        cell.to_owned()
    };
    if cell.contains([',', '"', '\n', '\r']) {
        format!("\"{}\"", cell.replace('"', "\"\""))
    } else {
        cell
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cells_that_would_part_are_quoted_and_formulas_are_text() {
        assert_eq!(quoted("a, b"), "\"a, b\"");
        assert_eq!(quoted("6\" pipe"), "\"6\"\" pipe\"");
        assert_eq!(quoted("=1+1"), "'=1+1");
        assert_eq!(quoted("-0.5"), "-0.5");
    }

    #[test]
    fn every_line_has_every_column() {
        let count = |line: &str| line.trim_end().split(',').count();
        for table in [ESTIMATES, TORQUES, DRIVERS] {
            let columns = FIRST.len() + table.columns.len();
            assert_eq!(count(&table.header()), columns);
            assert_eq!(
                count(&table.without("a.toml", Ended::Failed, "no")),
                columns
            );
        }
    }
}
