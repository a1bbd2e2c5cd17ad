//! The rings around every bolt, and why their sum is not the joint.

use crate::{
    estimate::{Estimate, RingRow},
    report::{
        number::{four, wrapped},
        table::{Side, aligned},
        text::WIDTH,
    },
    units::{Shown, System},
};
use std::fmt::Write;

/// The rings of every bolt.
pub fn rings(tables: &[Vec<RingRow>], units: System) -> String {
    let kinds = [
        Shown::Length,
        Shown::Area,
        Shown::Pressure,
        Shown::Conductance,
    ];
    let [length, area, pressure, local] = kinds.map(|shown| units.unit(shown));
    let names = [
        ("from", length),
        ("to", length),
        ("area", area),
        ("pressure", pressure),
        ("local", local),
    ]
    .map(|(what, unit)| format!("{what}\n{}", unit.name));
    let right = Side::Right;
    let mut text = String::new();
    for (index, rings) in tables.iter().enumerate() {
        let rows: Vec<Vec<String>> = rings
            .iter()
            .map(|ring| {
                vec![
                    four(ring.radius[0] / length.size),
                    four(ring.radius[1] / length.size),
                    four(ring.area / area.size),
                    four(ring.pressure / pressure.size),
                    four(ring.conductance / local.size),
                    four(ring.share),
                    four(ring.cumulative),
                ]
            })
            .collect();
        let _ = writeln!(text, "\nrings around bolt {}", index + 1);
        text.push_str(&aligned(
            &[
                (&names[0], right),
                (&names[1], right),
                (&names[2], right),
                (&names[3], right),
                (&names[4], right),
                ("ring\nW/K", right),
                ("sum\nW/K", right),
            ],
            &rows,
        ));
    }
    text
}

/// Why the sum of all rings is not the joint; empty without rings.
pub fn ring_sum(estimate: &Estimate, tables: &[Vec<RingRow>]) -> String {
    let ends = tables.iter().filter_map(|rings| rings.last());
    let sum: f64 = ends.map(|ring| ring.cumulative).sum();
    let Some(case) = estimate.cases.first().filter(|_| sum > 0.0) else {
        return String::new();
    };
    let added = case.results.added_by_joint.resistance.nominal;
    let line = format!(
        "all rings together {} W/K, which is {} K/W with each face at one temperature; the joint adds {} K/W, {} times \
         that, because heat must first squeeze through the plates to the rings: their sum is contact only, never the \
         joint",
        four(sum),
        four(sum.recip()),
        four(added),
        four(added * sum),
    );
    format!("\n{}\n", wrapped(&line, WIDTH, 2))
}
