//! The pressure block of the JSON: what every field tells, and what only a solved one does.

use schemars::JsonSchema;
use serde::Serialize;

use crate::estimate::{CaseResult, ConeBeside, Flatness, SolverHealth};

/// Pressure and gap between the faces at nominal force.
#[derive(Serialize, JsonSchema)]
pub struct PressureTold {
    /// Highest pressure, Pa
    peak: f64,
    /// Area in contact, m²
    contact_area: f64,
    /// Distance from the nearest bolt axis that holds 95 % of the force, m
    radius_95: f64,
    /// Force carried, N
    force: f64,
    /// Widest gap, m; null for the cone, which knows none
    gap_max: Option<f64>,
    /// Mean gap, m; null for the cone, which knows none
    gap_mean: Option<f64>,
    /// Mean distance of the force from the nearest bolt axis, m; null for the cone
    mean_force_radius: Option<f64>,
    /// Faces that are not flat; null for the cone
    flatness: Option<FlatnessTold>,
    /// The cone beside the solved field; null for the cone itself, and where it cannot carry the joint
    cone: Option<ConeTold>,
    /// How well the solver did; null for the cone
    solver: Option<SolverTold>,
}

/// What becomes of faces that are not flat.
#[derive(Serialize, JsonSchema)]
struct FlatnessTold {
    /// Flat, of known shape, or stated as a height alone
    #[schemars(extend("enum" = ["flat", "known", "stated"]))]
    kind: &'static str,
    /// Widest initial gap of a known shape, or the stated height, m; null for flat faces
    height: Option<f64>,
    /// Widest gap under the bolts, of both ways to be bent the wider one, m; null for flat faces
    left: Option<f64>,
    /// Widest gap with convex faces, m; null but for a stated height
    left_convex: Option<f64>,
    /// Widest gap with concave faces, m; null but for a stated height
    left_concave: Option<f64>,
    /// Widest gap of the same joint with flat faces, m; null for flat faces
    left_flat: Option<f64>,
    /// Whether the bolts close the shape; null for flat faces
    closes: Option<bool>,
}

/// What the closed-form cone says of the same joint.
#[derive(Serialize, JsonSchema)]
struct ConeTold {
    /// Distance from the nearest bolt axis that holds 95 % of the force, m
    radius_95: f64,
    /// Faying faces alone, K/W
    contact: f64,
    /// Heated zone to sink surface, K/W
    source_to_sink: f64,
    /// How far the cone lies above the solved field
    difference: ConeDifference,
}

/// How far the cone lies above the solved field, share of the latter.
#[derive(Serialize, JsonSchema)]
struct ConeDifference {
    /// Of the radius that holds 95 % of the force, share of 1
    radius_95: f64,
    /// Of the faying faces alone, share of 1
    contact: f64,
    /// Of source to sink, share of 1
    source_to_sink: f64,
}

/// How a solver came to its field, and what is left.
#[derive(Serialize, JsonSchema)]
struct SolverTold {
    /// Unknown displacements
    unknowns: usize,
    /// Steps of the contact search
    steps: usize,
    /// Rounds of the linear solver, all steps together
    rounds: usize,
    /// Force between the faces over clamp force, off from 1
    force_balance: f64,
    /// Largest breach of no pull and no overlap, over the peak pressure or the widest gap
    complementarity: f64,
    /// Whether the energy fell in every step; null where no step is taken by energy
    energy_fell: Option<bool>,
    /// Residual of the last linear system over its load; null where it is eliminated
    residual: Option<f64>,
    /// Heat in over heat out, off from 1
    heat_balance: f64,
}

/// Pressure and gap of one case; the keys of a solved field are null for the cone.
pub fn pressure(case: &CaseResult) -> PressureTold {
    let pressure = &case.pressure;
    let solved = pressure.solved.as_ref();
    PressureTold {
        peak: pressure.peak,
        contact_area: pressure.contact_area,
        radius_95: pressure.radius_95,
        force: pressure.force,
        gap_max: pressure.gap_max,
        gap_mean: pressure.gap_mean,
        mean_force_radius: solved.map(|field| field.mean_force_radius),
        flatness: solved.map(|field| flatness(&field.flatness)),
        cone: solved
            .and_then(|field| field.cone.as_ref())
            .map(|cone| beside(cone, case)),
        solver: solved.map(|field| health(&field.health)),
    }
}

/// The shape of the faces; `left` is the widest gap, the wider one where both shapes were taken.
fn flatness(flatness: &Flatness) -> FlatnessTold {
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
    FlatnessTold {
        kind,
        height,
        left,
        left_convex: shape(0),
        left_concave: shape(1),
        left_flat: flat,
        closes: flatness.closes(),
    }
}

/// The cone with its differences, relative to the solved field.
fn beside(cone: &ConeBeside, case: &CaseResult) -> ConeTold {
    let [radius_95, contact, source_to_sink] = differences(cone, case);
    ConeTold {
        radius_95: cone.radius_95,
        contact: cone.contact,
        source_to_sink: cone.source_to_sink,
        difference: ConeDifference {
            radius_95,
            contact,
            source_to_sink,
        },
    }
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

fn health(health: &SolverHealth) -> SolverTold {
    SolverTold {
        unknowns: health.unknowns,
        steps: health.steps,
        rounds: health.rounds,
        force_balance: health.force_balance,
        complementarity: health.complementarity,
        energy_fell: health.energy_fell,
        residual: health.residual,
        heat_balance: health.heat_balance,
    }
}
