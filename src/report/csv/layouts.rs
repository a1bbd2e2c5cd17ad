//! The layouts of a search as rows of one table: one row for every layout and case.

use super::{Table, number};
use crate::{
    layout::{Answer, Row},
    report::arrange::{pattern, verdict},
};

/// One row for every layout in every case.
pub const LAYOUTS: Table = Table {
    name: "layouts",
    columns: &[
        "title",
        "goal",
        "quantity",
        "complete",
        "front",
        "best",
        "bolts",
        "fastener",
        "torque_Nm",
        "pattern",
        "mass_kg",
        "meets",
        "heads_over_heat",
        "places_m",
        "case",
        "screened_K_per_W",
        "nominal_K_per_W",
        "least_force_K_per_W",
        "largest_force_K_per_W",
        "low_K_per_W",
        "high_K_per_W",
    ],
};

/// The cells of an answer.
pub fn layouts(answer: &Answer) -> Vec<Vec<String>> {
    let rows = answer.rows.iter().enumerate();
    rows.flat_map(|(index, row)| of_row(answer, (index, row)))
        .collect()
}

fn of_row(answer: &Answer, (index, row): (usize, &Row)) -> Vec<Vec<String>> {
    let places: Vec<String> = row.places.iter().map(|[x, y]| format!("{x} {y}")).collect();
    let first = vec![
        answer.title.clone(),
        answer.goal.name().to_owned(),
        answer.target.measure.name().to_owned(),
        answer.complete.to_string(),
        row.front.to_string(),
        (answer.best == Some(index)).to_string(),
        row.places.len().to_string(),
        row.label.clone(),
        number(row.torque),
        pattern(row),
        row.mass.to_string(),
        verdict(row).to_owned(),
        row.over_heat.to_string(),
        places.join("; "),
    ];
    let case = |(index, name): (usize, &&str)| {
        let solved = row.solution.as_ref();
        let [nominal, least, largest] = solved.map_or([None; 3], |solution| {
            solution.cases[index].values().map(Some)
        });
        let band = row.band.as_ref().map(|band| band[index]);
        let [low, high] = band.map_or([None; 2], |ends| ends.map(Some));
        let mut cells = first.clone();
        cells.push((*name).to_owned());
        cells.extend([Some(row.screened), nominal, least, largest, low, high].map(number));
        cells
    };
    answer.cases.iter().enumerate().map(case).collect()
}
