//! A fitted law as a `[measured]` block that a joint file takes as it stands.

use crate::{
    fit::{
        readings::Abscissa,
        series::{Branch, Series, Shape},
    },
    units::{Quantity, show},
};
use std::fmt::Write;

/// The block, in TOML, with what it rests on in comments.
///
/// A power law against pressure is written as its two ends: between points a joint file follows a
/// power law, below the first it goes straight to the value without load, above the last it holds.
/// `bolts` share a measured W/K.
pub fn block(series: &Series, branch: &Branch, bolts: u32) -> String {
    let x = |value: f64| show(value, series.abscissa.quantity());
    let [low, high] = branch.range();
    let direction = branch
        .direction
        .map_or_else(String::new, |way| format!(", {}", way.name()));
    let mut text = format!(
        "[measured]\n# {} readings from {} to {}{direction}\n",
        branch.readings.len(),
        x(low),
        x(high),
    );
    match &branch.shape {
        Shape::Law(law) if series.abscissa == Abscissa::Pressure => {
            let _ = writeln!(
                text,
                "# h = {} (p / {})^{:.3}, written as its two ends",
                show(law.coefficient, Quantity::FilmCoefficient),
                x(law.reference),
                law.exponent,
            );
            points(&mut text, &law.range.map(|end| (end, law.at(end))));
        }
        Shape::Table(table) => points(&mut text, &table.rows),
        Shape::Law(law) => {
            let key = match series.abscissa {
                Abscissa::Torque => "torque",
                Abscissa::Pressure | Abscissa::Force => "force",
            };
            if bolts > 1 {
                let _ = writeln!(text, "# of {bolts} bolts; the law is that of one");
            }
            let _ = writeln!(
                text,
                "law = {{ conductance = \"{}\", {key} = \"{}\", {key}_exponent = {:.4} }}",
                show(law.coefficient / f64::from(bolts), Quantity::Conductance),
                x(law.reference),
                law.exponent,
            );
        }
    }
    let _ = writeln!(
        text,
        "scatter = \"{}\"",
        show(branch.shape.factor() - 1.0, Quantity::Ratio)
    );
    text
}

fn points(text: &mut String, rows: &[(f64, f64)]) {
    text.push_str("points = [\n");
    for (pressure, conductance) in rows {
        let _ = writeln!(
            text,
            "  [\"{}\", \"{}\"],",
            show(*pressure, Quantity::Pressure),
            show(*conductance, Quantity::FilmCoefficient),
        );
    }
    text.push_str("]\n");
}
