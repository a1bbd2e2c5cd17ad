//! Volumes of head, nut and washers, from the seats of the catalogue.

use std::f64::consts::PI;

use crate::{
    catalog::{self, SeatRecord, Thread},
    joint::{Engagement, Hardware, seats::Bolt},
};

/// Width across flats over the least bearing diameter of metric hexagons, m.
///
/// ISO 4014 and ISO 4032 from M4 to M16: 1.1 to 1.5 mm, from memory.
const BEYOND_BEARING: f64 = 1.2e-3;
/// Bearing diameter over width across flats where the catalogue had none to print (`seats.toml`).
const OF_FLATS: f64 = 0.95;
/// Share of its cylinder that a domed head fills, recess taken off (judgement).
const DOME: f64 = 0.8;

/// The parts of a bolt; the recess of a socket head is what its flange has beyond the bearing.
pub(super) fn of(bolt: Bolt<'_>, washers: [Option<&SeatRecord>; 2]) -> Hardware {
    let thread = bolt.thread;
    let nut = match bolt.engagement {
        Engagement::Nut => catalog::seat("nut", &thread.name).and_then(|nut| {
            let height = nut.height?;
            let section = hexagon(flats(nut, thread)) - disc(thread.pitch_diameter);
            Some((section * height, height))
        }),
        Engagement::Tapped { .. } | Engagement::Insert { .. } => None,
    };
    let washer = |washer: &SeatRecord| {
        let hole = washer.inner.unwrap_or(thread.diameter);
        Some((disc(washer.outer) - disc(hole)) * washer.height?)
    };
    Hardware {
        head: bolt.parts.head.and_then(|record| head(record, thread)),
        nut,
        washers: washers.into_iter().flatten().map(washer).sum(),
    }
}

fn head(record: &SeatRecord, thread: &Thread) -> Option<f64> {
    let height = record.height?;
    Some(match record.kind.as_str() {
        "hex" => hexagon(flats(record, thread)) * height,
        // What the socket takes off, the cylinder has beyond its bearing diameter, within 3 %.
        "socket" => disc(record.outer) * height,
        "countersunk" => {
            let (wide, narrow) = (record.outer, thread.diameter);
            PI / 12.0 * height * (wide * wide + wide * narrow + narrow * narrow)
        }
        _ => DOME * disc(record.outer) * height,
    })
}

/// Width across flats, m.
fn flats(record: &SeatRecord, thread: &Thread) -> f64 {
    if thread.inch {
        record.outer / OF_FLATS
    } else {
        record.outer + BEYOND_BEARING
    }
}

fn hexagon(flats: f64) -> f64 {
    0.5 * 3.0_f64.sqrt() * flats * flats
}

fn disc(diameter: f64) -> f64 {
    0.25 * PI * diameter * diameter
}
