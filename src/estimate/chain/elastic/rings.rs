//! Rings around a bolt, as tables show them.

use crate::estimate::RingRow;

/// Rings across the seat of a head, from hole to bearing radius.
const RINGS_UNDER_HEAD: f64 = 8.0;
/// Growth of the rings' width beyond two bearing radii.
const RING_GROWTH: f64 = 1.2;

/// What lies in a ring.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Sum {
    /// Faying area, m².
    pub(super) area: f64,
    /// Force, N.
    pub(super) force: f64,
    /// Conductance, W/K.
    pub(super) conductance: f64,
}

/// Edges of rings around a bolt from its hole (m) until they reach `end`.
pub(super) fn edges(hole_radius: f64, bearing_radius: f64, end: f64) -> Vec<f64> {
    let mut width = (bearing_radius - hole_radius) / RINGS_UNDER_HEAD;
    let mut edges = vec![hole_radius];
    let mut edge = hole_radius;
    while edge < end {
        edge += width;
        edges.push(edge);
        if edge > 2.0 * bearing_radius {
            width *= RING_GROWTH;
        }
    }
    edges
}

/// The rows of a table; rings without area are left out.
pub(super) fn rows(edges: &[f64], sums: &[Sum]) -> Vec<RingRow> {
    let mut cumulative = 0.0;
    edges
        .windows(2)
        .zip(sums)
        .filter(|(_, sum)| sum.area > 0.0)
        .map(|(pair, sum)| {
            cumulative += sum.conductance;
            RingRow {
                radius: [pair[0], pair[1]],
                area: sum.area,
                pressure: sum.force / sum.area,
                conductance: sum.conductance / sum.area,
                share: sum.conductance,
                cumulative,
            }
        })
        .collect()
}
