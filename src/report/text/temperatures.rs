//! Where it is hot: the hottest point, the means of the plates, the drop between the faces.

use crate::{
    estimate::{CaseResult, Estimate, Temperatures},
    report::{
        number::{brief, four, plain, wrapped},
        text::WIDTH,
    },
};

/// Temperatures of a solved heat in words; empty for the cone.
pub(super) fn told(estimate: &Estimate, case: &CaseResult) -> String {
    let Some(found) = &case.temperatures else {
        return String::new();
    };
    let (factor, unit, at) = match estimate.heat {
        Some(heat) => (heat, "K", format!("at {} W", four(heat))),
        None => (1.0, "K/W", "per watt".to_owned()),
    };
    let shown = |per_watt: f64| format!("{} {unit}", four(factor * per_watt));
    let means: Vec<String> = found
        .names
        .iter()
        .zip(&found.plate_means)
        .map(|(name, mean)| format!("{} {}", plain(name), shown(*mean)))
        .collect();
    let drops: Vec<String> = found.interface_drops.iter().map(|d| shown(*d)).collect();
    let line = format!(
        "above the sink surface {at}: hottest {} {}; means of the plates {}; mean drop across the faces {}",
        shown(found.hottest),
        place(found),
        means.join(", "),
        drops.join(", "),
    );
    wrapped(&line, WIDTH, 2) + "\n"
}

/// The hottest point in the coordinates of its plate.
fn place(found: &Temperatures) -> String {
    let [x, y, height] = found.hottest_at.map(|length| brief(rounded(1e3 * length)));
    let name = found.names.first().map_or("", String::as_str);
    format!(
        "at x {x}, y {y} mm of {}, {height} mm above its lowest face",
        plain(name)
    )
}

/// To a tenth of a millimetre: the grid tells no more.
fn rounded(millimetres: f64) -> f64 {
    (10.0 * millimetres).round() / 10.0
}
