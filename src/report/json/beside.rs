//! What `estimate` tells beside the joint itself: rings, other media, draws that were solved.

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    estimate::RingRow,
    report::{
        json::shapes::{Ends, ResistanceEnds},
        media::vacuum_over,
    },
    uncertainty::{InMedium, Verification},
};

/// A ring around a bolt.
#[derive(Serialize, JsonSchema)]
pub struct RingTold {
    /// Inner radius, m
    inner_radius: f64,
    /// Outer radius, m
    outer_radius: f64,
    /// Area, m²
    area: f64,
    /// Pressure, Pa
    pressure: f64,
    /// Local conductance, W/(m² K)
    conductance_per_area: f64,
    /// Conductance of the ring, W/K
    conductance: f64,
    /// Conductance of this ring and all within, W/K
    cumulative: f64,
}

/// The joint in one medium.
#[derive(Serialize, JsonSchema)]
pub struct MediumTold {
    /// The medium
    medium: String,
    /// Absolute pressure, Pa; null in vacuum
    pressure: Option<f64>,
    /// Heated zone to sink surface
    source_to_sink: ResistanceEnds,
    /// What the joint adds
    added_by_joint: ResistanceEnds,
    /// Mean of the source above the mean sink surface, K; null where no heat is stated
    rise: Option<Ends>,
    /// What the joint adds in vacuum over what it adds here; null where vacuum is not among the media
    vacuum_over_medium: Option<f64>,
}

/// Draws solved beside the surfaces that all draws are read from.
#[derive(Serialize, JsonSchema)]
pub struct VerificationTold {
    /// Draws solved
    draws: usize,
    /// Largest error of source to sink, share of 1
    largest_error: f64,
    /// Mean error of source to sink, share of 1
    mean_error: f64,
}

/// Draws solved beside their surfaces; nothing on the cone.
pub fn verification(found: Option<&Verification>) -> Value {
    json!(found.map(|found| VerificationTold {
        draws: found.draws,
        largest_error: found.largest,
        mean_error: found.mean,
    }))
}

/// The same joint in several media.
pub fn media(media: &[InMedium]) -> Value {
    let row = |each: &InMedium| MediumTold {
        medium: each.medium.word(),
        pressure: each.medium.pressure(),
        source_to_sink: (&each.source_to_sink).into(),
        added_by_joint: (&each.added_by_joint).into(),
        rise: each.rise.as_ref().map(Ends::from),
        vacuum_over_medium: vacuum_over(media, each),
    };
    json!(media.iter().map(row).collect::<Vec<_>>())
}

/// The rings of every bolt.
pub fn rings(tables: &[Vec<RingRow>]) -> Value {
    let row = |ring: &RingRow| RingTold {
        inner_radius: ring.radius[0],
        outer_radius: ring.radius[1],
        area: ring.area,
        pressure: ring.pressure,
        conductance_per_area: ring.conductance,
        conductance: ring.share,
        cumulative: ring.cumulative,
    };
    let tables = tables.iter();
    json!(
        tables
            .map(|rings| rings.iter().map(row).collect::<Vec<_>>())
            .collect::<Vec<_>>()
    )
}
