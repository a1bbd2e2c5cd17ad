//! What a load along the bolts does, one row for all bolts that share it.

use crate::{
    estimate::{BoltResult, CaseResult},
    report::{
        number::{four, percent},
        table::{Side, aligned},
        text::groups,
    },
};

/// The table of the loads; empty where none is stated.
pub(super) fn loads(case: &CaseResult) -> String {
    let rows: Vec<Vec<String>> = groups(&case.bolts)
        .into_iter()
        .filter_map(|(name, group)| row(name, group[0]))
        .collect();
    if rows.is_empty() {
        return String::new();
    }
    let right = Side::Right;
    aligned(
        &[
            ("load along\neach bolt", Side::Left),
            ("load kN\nmost", right),
            ("share in\nthe bolt", right),
            ("bolt kN\nmost", right),
            ("clamp left\nkN least", right),
            ("\nnominal", right),
            ("faces part at\ntimes the load", right),
            ("of yield\nin service", right),
        ],
        &rows,
    )
}

fn row(name: String, bolt: &BoltResult) -> Option<Vec<String>> {
    let shared = bolt.axial.as_ref()?;
    let separation = if shared.separation.is_finite() {
        four(shared.separation)
    } else {
        "never".to_owned()
    };
    Some(vec![
        name,
        four(shared.load.high / 1e3),
        percent(shared.load_factor.nominal),
        four(shared.bolt_force / 1e3),
        four(shared.residual.low / 1e3),
        four(shared.residual.nominal / 1e3),
        separation,
        bolt.use_in_service.map_or_else(|| "–".to_owned(), percent),
    ])
}
