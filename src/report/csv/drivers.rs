//! What drives the bands as rows of one table: one row for every input of every joint.

use super::{Table, band, number};
use crate::uncertainty::{Ranked, Ranking};

/// One row for every input of every joint.
pub const DRIVERS: Table = Table {
    name: "drivers",
    columns: &[
        "title",
        "field",
        "resolution",
        "case",
        "of",
        "unit",
        "low",
        "nominal",
        "high",
        "input",
        "first",
        "first_half_interval",
        "total",
        "total_half_interval",
        "alone_low",
        "alone_high",
        "known_low",
        "known_high",
        "narrowing",
        "remedy",
    ],
};

/// The cells of every input, the strongest first.
pub fn drivers(ranking: &Ranking) -> Vec<Vec<String>> {
    let some = |value: f64| number(Some(value));
    let row = |input: &Ranked| {
        let mut cells = vec![
            ranking.title.clone(),
            ranking.field.to_owned(),
            ranking.resolution.to_owned(),
            ranking.case.to_owned(),
            ranking.target.name().to_owned(),
            ranking.target.unit().to_owned(),
        ];
        cells.extend(band(Some(&ranking.band)));
        cells.push(input.input.to_owned());
        for index in [&input.index.first, &input.index.total] {
            cells.extend([some(index.value), some(index.confidence)]);
        }
        let [one, other] = input.alone;
        cells.extend([some(one.min(other)), some(one.max(other))]);
        cells.extend([number(input.known.low), number(input.known.high)]);
        cells.push(some(input.narrowing(&ranking.band)));
        cells.push(input.remedy.clone());
        cells
    };
    ranking.inputs.iter().map(row).collect()
}
