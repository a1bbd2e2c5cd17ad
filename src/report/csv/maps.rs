//! The fields of an interface as a table of points, and a joint as a chain of nodes.

use crate::{
    estimate::{CaseResult, Estimate, FieldMap, HeatMap},
    report::csv::{line, number},
};

/// Under what a map was solved.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Condition {
    /// Mean temperature of the sink surface, K.
    pub sink: f64,
    /// Heat through the joint, W; none where the file states none.
    pub heat: Option<f64>,
}

/// Every point of a map that lies on both faces, row by row from below.
///
/// Temperatures of the faces are empty where no heat is stated, and with the gap where the field
/// knows none; `K_per_W` is the rise above the mean sink surface per watt. `flux` is what crosses
/// between the faces, in W/m² and per watt through the joint, 1/m².
pub fn map(field: &FieldMap, heat: Option<&HeatMap>, condition: Condition) -> String {
    let names = [
        "x_m",
        "y_m",
        "pressure_Pa",
        "gap_m",
        "conductance_W_per_m2_K",
        "warm_face_K",
        "cold_face_K",
        "warm_face_K_per_W",
        "cold_face_K_per_W",
        "flux_W_per_m2",
        "flux_per_m2",
    ];
    let mut text = line(&names.map(str::to_owned));
    let [columns, rows] = field.size;
    let [left, lower, right, upper] = field.window;
    let heat = heat.filter(|heat| heat.size == field.size);
    for (index, pressure) in field.pressure.iter().enumerate() {
        if !pressure.is_finite() {
            continue;
        }
        let at = |low: f64, high: f64, (place, of): (usize, usize)| {
            low + (high - low) * (place as f64 + 0.5) / of as f64
        };
        let rises = [0, 1].map(|face| heat.map(|heat| heat.rises[face][index]));
        let warmth = rises.map(|rise| Some(condition.sink + rise? * condition.heat?));
        let flux = heat.map(|heat| heat.flux[index]);
        let cells = [
            Some(at(left, right, (index % columns, columns))),
            Some(at(lower, upper, (index / columns, rows))),
            Some(*pressure),
            field.gap.as_ref().map(|gap| gap[index]),
            Some(field.conductance[index]),
            warmth[0],
            warmth[1],
            rises[0],
            rises[1],
            flux.and_then(|flux| Some(flux * condition.heat?)),
            flux,
        ];
        text.push_str(&line(&cells.map(number)));
    }
    text
}

/// A joint as nodes and the conductances between them, W/K, one chain for every case.
///
/// ```text
/// source – mean of the first plate – … – mean of the last plate – sink
/// ```
///
/// In series they give node to node between the plates and source to sink as a whole. What stands
/// between two plates holds the spreading to the bolts and their shanks. Low and high are drawn for
/// two plates, where that conductance is node to node; the others are at nominal.
///
/// Error: a sentence, where the field knows no means of the plates or no finite conductance stands
/// between two nodes.
pub fn nodes(estimate: &Estimate) -> Result<String, String> {
    let names = [
        "case",
        "node_a",
        "node_b",
        "conductance_W_per_K_low",
        "conductance_W_per_K",
        "conductance_W_per_K_high",
    ];
    let mut text = line(&names.map(str::to_owned));
    for case in &estimate.cases {
        for (ends, conductance) in chain(case)? {
            let mut cells = vec![case.name.to_owned()];
            cells.extend(ends);
            cells.extend(conductance.map(number));
            text.push_str(&line(&cells));
        }
    }
    Ok(text)
}

/// Two nodes, and low, nominal and high between them, W/K.
type Link = ([String; 2], [Option<f64>; 3]);

fn chain(case: &CaseResult) -> Result<Vec<Link>, String> {
    let found = case.temperatures.as_ref().ok_or(
        "the closed form solves no means of the plates, so that it has no nodes: leave out --field cone",
    )?;
    let results = &case.results;
    let mut names = vec!["source".to_owned()];
    names.extend(found.names.iter().map(|name| format!("plate {name}")));
    names.push("sink".to_owned());
    // Above the sink surface, per watt: K/W.
    let mut rises = vec![results.source_to_sink.resistance.nominal];
    rises.extend(&found.plate_means);
    rises.push(0.0);
    let two_plates = found.plate_means.len() == 2;
    let mut links = Vec::new();
    for (place, (ends, rise)) in names.windows(2).zip(rises.windows(2)).enumerate() {
        let resistance = rise[0] - rise[1];
        if !(resistance > 0.0 && resistance.is_finite()) {
            return Err(format!(
                "{} is no warmer than {}: no conductance stands between their means",
                ends[0], ends[1]
            ));
        }
        let drawn = Some(&results.node_to_node.resistance).filter(|_| two_plates && place == 1);
        links.push((
            [ends[0].clone(), ends[1].clone()],
            [
                drawn.and_then(|band| band.high).map(f64::recip),
                Some(resistance.recip()),
                drawn.and_then(|band| band.low).map(f64::recip),
            ],
        ));
    }
    Ok(links)
}
