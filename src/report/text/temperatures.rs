//! Where it is hot: the hottest point, the means of the plates, the drop between the faces.

use crate::{
    estimate::{CaseResult, Estimate, Temperatures},
    report::{
        number::{brief, four, plain, wrapped},
        text::WIDTH,
    },
};
use std::fmt::Write;

/// Temperatures of a solved heat in words; empty for the cone.
pub(super) fn told(estimate: &Estimate, case: &CaseResult) -> String {
    let Some(found) = &case.temperatures else {
        return String::new();
    };
    let (factor, unit) = match estimate.heat {
        Some(heat) => (heat, "K"),
        None => (1.0, "K/W"),
    };
    let shown = |per_watt: f64| format!("{} {unit}", four(factor * per_watt));
    let means: Vec<String> = found
        .names
        .iter()
        .zip(&found.plate_means)
        .map(|(name, mean)| format!("{} {}", plain(name), shown(*mean)))
        .collect();
    let mut line = format!("hottest point {}", place(found));
    // With the heat the line of the rise tells how hot, and the drop of all faces together.
    if estimate.heat.is_none() {
        let _ = write!(line, ": {} above the sink surface", shown(found.hottest));
    }
    let _ = write!(line, "; means above the sink surface: {}", means.join(", "));
    if estimate.heat.is_none() || found.interface_drops.len() > 1 {
        let drops: Vec<String> = found.interface_drops.iter().map(|d| shown(*d)).collect();
        let _ = write!(line, "; across the faces {}", drops.join(", "));
    }
    wrapped(&line, WIDTH, 2) + "\n"
}

/// The hottest point in the coordinates of its plate.
fn place(found: &Temperatures) -> String {
    let [x, y, height] = found.hottest_at.map(|length| 1e3 * length);
    // In plan the grid tells no more than whole millimetres.
    let [x, y] = [x, y].map(|length| brief(length.round()));
    let height = brief(0.1 * (10.0 * height).round());
    let name = found.names.first().map_or("", String::as_str);
    format!(
        "at x {x}, y {y} mm of {}, {height} mm above its lowest face",
        plain(name)
    )
}
