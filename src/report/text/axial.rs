//! What a load along the bolts does, one row for all bolts that share it.

use crate::{
    estimate::{BoltResult, CaseResult},
    report::{
        number::{four, percent},
        table::{Side, aligned},
        text::groups,
    },
    units::{Shown, System},
};

/// The table of the loads; empty where none is stated.
pub(super) fn loads(case: &CaseResult, units: System) -> String {
    let force = units.unit(Shown::Force);
    let rows: Vec<Vec<String>> = groups(&case.bolts)
        .into_iter()
        .filter_map(|(name, group)| row(name, group[0], force.size))
        .collect();
    if rows.is_empty() {
        return String::new();
    }
    let right = Side::Right;
    let [load, bolt, left] = [("load", "most"), ("bolt", "most"), ("clamp left", "least")].map(
        |(what, end)| match what {
            "clamp left" => format!("{what}\n{} {end}", force.name),
            _ => format!("{what} {}\n{end}", force.name),
        },
    );
    aligned(
        &[
            ("load along\neach bolt", Side::Left),
            (&load, right),
            ("share in\nthe bolt", right),
            (&bolt, right),
            (&left, right),
            ("\nnominal", right),
            ("faces part at\ntimes the load", right),
            ("of yield\nin service", right),
        ],
        &rows,
    )
}

fn row(name: String, bolt: &BoltResult, unit: f64) -> Option<Vec<String>> {
    let shared = bolt.axial.as_ref()?;
    let separation = if shared.separation.is_finite() {
        four(shared.separation)
    } else {
        "never".to_owned()
    };
    Some(vec![
        name,
        four(shared.load.high / unit),
        percent(shared.load_factor.nominal),
        four(shared.bolt_force / unit),
        four(shared.residual.low / unit),
        four(shared.residual.nominal / unit),
        separation,
        bolt.use_in_service.map_or_else(|| "–".to_owned(), percent),
    ])
}
