//! Torque windows as rows of one table: one row for every joint.

use super::{Table, number};
use crate::estimate::{Range, Side, TorqueSweep};

/// One row for every joint.
pub const TORQUES: Table = Table {
    name: "torques",
    columns: &[
        "title",
        "field",
        "resolution",
        "case",
        "group",
        "stated_Nm",
        "source_to_sink_stated_K_per_W",
        "best_Nm",
        "knee_Nm",
        "largest_Nm",
        "largest_by",
        "least_Nm",
        "confidence",
        "window",
        "window_low_Nm",
        "window_low_by",
        "window_high_Nm",
        "window_high_by",
        "opened_by",
        "cautions",
    ],
};

/// The cells of a sweep.
pub fn torques(sweep: &TorqueSweep) -> Vec<Vec<String>> {
    let window = &sweep.window;
    let least = window.limits.iter().find(|limit| limit.side == Side::Least);
    let verdict = match (&window.both, &window.heat) {
        (None, _) => "none",
        (Some(_), None) => "strength alone",
        (Some(_), Some(_)) if !window.trusted => "not for sure",
        (Some(_), Some(_)) => "open",
    };
    let ends = |of: fn(&Range) -> crate::estimate::End| {
        let end = window.both.as_ref().map(of);
        [
            number(end.map(|end| end.torque)),
            end.map_or("", |end| end.by).to_owned(),
        ]
    };
    let opened = window.trials.iter().filter(|trial| trial.window.is_some());
    let opened: Vec<&str> = opened.map(|trial| trial.change.as_str()).collect();
    let codes: Vec<&str> = sweep.cautions.iter().map(|each| each.code).collect();
    let mut cells = vec![
        sweep.title.clone(),
        sweep.field.to_owned(),
        sweep.resolution.to_owned(),
        sweep.case.to_owned(),
        sweep.group.clone(),
        sweep.stated.to_string(),
        number(Some(sweep.at_stated)),
        number(sweep.best),
        number(window.knee),
        number(sweep.largest.map(|(torque, _)| torque)),
        sweep.largest.map_or("", |(_, by)| by).to_owned(),
        number(least.map(|limit| limit.torque)),
        number(window.confidence),
        verdict.to_owned(),
    ];
    cells.extend(ends(|range| range.low));
    cells.extend(ends(|range| range.high));
    cells.push(opened.join("; "));
    cells.push(codes.join(" "));
    vec![cells]
}
