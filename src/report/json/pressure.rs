//! The pressure block of the JSON: what every field tells, and what only a solved one does.

use crate::estimate::{CaseResult, ConeBeside, Flatness, SolverHealth};
use serde_json::{Value, json};

/// Pressure and gap of one case; the keys of a solved field are null for the cone.
pub fn pressure(case: &CaseResult) -> Value {
    let pressure = &case.pressure;
    let solved = pressure.solved.as_ref();
    json!({
        "peak": pressure.peak,
        "contact_area": pressure.contact_area,
        "radius_95": pressure.radius_95,
        "force": pressure.force,
        "gap_max": pressure.gap_max,
        "gap_mean": pressure.gap_mean,
        "mean_force_radius": solved.map(|field| field.mean_force_radius),
        "flatness": solved.map(|field| flatness(&field.flatness)),
        "cone": solved.and_then(|field| field.cone.as_ref()).map(|cone| beside(cone, case)),
        "solver": solved.map(|field| health(&field.health)),
    })
}

/// The shape of the faces; `left` is the widest gap, the wider one where both shapes were taken.
fn flatness(flatness: &Flatness) -> Value {
    let (kind, height, left, flat) = match *flatness {
        Flatness::Flat => ("flat", None, None, None),
        Flatness::Known {
            initial,
            left,
            flat,
        } => ("known", Some(initial), Some(left), Some(flat)),
        Flatness::Stated { height, left, flat } => (
            "stated",
            Some(height),
            Some(left[0].max(left[1])),
            Some(flat),
        ),
    };
    let shape = |index: usize| match flatness {
        Flatness::Stated { left, .. } => Some(left[index]),
        Flatness::Flat | Flatness::Known { .. } => None,
    };
    json!({
        "kind": kind,
        "height": height,
        "left": left,
        "left_convex": shape(0),
        "left_concave": shape(1),
        "left_flat": flat,
        "closes": flatness.closes(),
    })
}

/// The cone with its differences, relative to the solved field.
fn beside(cone: &ConeBeside, case: &CaseResult) -> Value {
    let [radius_95, contact, source_to_sink] = differences(cone, case);
    json!({
        "radius_95": cone.radius_95,
        "contact": cone.contact,
        "source_to_sink": cone.source_to_sink,
        "difference": {
            "radius_95": radius_95,
            "contact": contact,
            "source_to_sink": source_to_sink,
        },
    })
}

/// How far the cone lies above the solved field, relative to the latter: radius that holds 95 % of
/// the force, contact only, source to sink.
pub fn differences(cone: &ConeBeside, case: &CaseResult) -> [f64; 3] {
    let results = &case.results;
    [
        (cone.radius_95, case.pressure.radius_95),
        (cone.contact, results.contact.resistance.nominal),
        (
            cone.source_to_sink,
            results.source_to_sink.resistance.nominal,
        ),
    ]
    .map(|(cone, solved)| cone / solved - 1.0)
}

fn health(health: &SolverHealth) -> Value {
    json!({
        "unknowns": health.unknowns,
        "steps": health.steps,
        "rounds": health.rounds,
        "force_balance": health.force_balance,
        "complementarity": health.complementarity,
        "energy_fell": health.energy_fell,
        "residual": health.residual,
        "heat_balance": health.heat_balance,
    })
}
