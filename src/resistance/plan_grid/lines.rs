//! Grid lines along one axis: at every edge, close in the contacts, wide between.

use crate::{
    joint::{Outline, Zone},
    resistance::cells::Plan,
};

/// Grid lines across the ring from the hole to the contact edge, at fineness 1.
const LINES_IN_CONTACT: f64 = 4.0;
/// Widest cell as a share of the longer side of the plan, at fineness 1.
const WIDEST: f64 = 1.0 / 24.0;
/// Growth of the cell width with distance from the contact edge.
const GROWTH: f64 = 0.25;

/// How densely lines are wanted along one axis.
pub(super) struct Axis {
    /// Edges of plates and heated zone, rising, m.
    stops: Vec<f64>,
    /// Lines wanted from each stop to evenly spaced places up to the next, at fineness 1.
    wanted: Vec<Vec<f64>>,
}

/// What one or more bolts want of an axis: their place, the width in the contact, its radius.
type Want = [f64; 3];

impl Axis {
    pub(super) fn new(plan: &Plan, axis: usize) -> Self {
        let stops = stops(plan, axis);
        let extent = stops[stops.len() - 1] - stops[0];
        let mut wants: Vec<Want> = plan
            .sites
            .iter()
            .map(|site| {
                let cone = &site.cone;
                let close = (cone.contact_radius - cone.hole_radius) / LINES_IN_CONTACT;
                [site.at[axis], close, cone.contact_radius]
            })
            .collect();
        // Rows of equal bolts want the same.
        wants.sort_by(|one, other| (one[0].total_cmp(&other[0])).then(one[1].total_cmp(&other[1])));
        wants.dedup();
        let widest = WIDEST * extent;
        let closest = wants.iter().fold(widest, |least, want| least.min(want[1]));
        let width = |x: f64| {
            let near = wants
                .iter()
                .map(|[at, close, radius]| close + GROWTH * ((x - at).abs() - radius).max(0.0));
            near.fold(widest, f64::min)
        };
        let wanted = stops
            .windows(2)
            .map(|pair| {
                // ∫ dx/width by steps that are fine against the closest lines.
                let steps = (4.0 * (pair[1] - pair[0]) / closest)
                    .clamp(400.0, 40_000.0)
                    .ceil();
                let step = (pair[1] - pair[0]) / steps;
                let mut sums = vec![0.0];
                for index in 0..steps as usize {
                    let x = pair[0] + (index as f64 + 0.5) * step;
                    sums.push(sums[index] + step / width(x));
                }
                sums
            })
            .collect();
        Self { stops, wanted }
    }

    /// Cells along the axis at a fineness.
    pub(super) fn count(&self, fineness: f64) -> usize {
        self.wanted.iter().map(|sums| parts(sums, fineness)).sum()
    }

    /// The lines at a fineness, rising, m.
    pub(super) fn lines(&self, fineness: f64) -> Vec<f64> {
        let mut lines = vec![self.stops[0]];
        for (pair, sums) in self.stops.windows(2).zip(&self.wanted) {
            let parts = parts(sums, fineness);
            let last = sums.len() - 1;
            let step = (pair[1] - pair[0]) / last as f64;
            for part in 1..parts {
                let wanted = sums[last] * part as f64 / parts as f64;
                let after = sums.partition_point(|sum| *sum < wanted);
                let back = (sums[after] - wanted) / (sums[after] - sums[after - 1]);
                lines.push(pair[0] + (after as f64 - back) * step);
            }
            lines.push(pair[1]);
        }
        lines
    }
}

/// Equal parts between two stops.
fn parts(sums: &[f64], fineness: f64) -> usize {
    (fineness * sums[sums.len() - 1]).ceil().max(1.0) as usize
}

fn stops(plan: &Plan, axis: usize) -> Vec<f64> {
    let mut stops: Vec<f64> = Vec::new();
    for (outline, origin) in &plan.outlines {
        let at = origin[axis];
        match *outline {
            Outline::Rectangle { size } => stops.extend([at, at + size[axis]]),
            Outline::Disc { radius } => stops.extend([at - radius, at + radius]),
            // `cells` refuses polygons before any grid is laid over them.
            Outline::Polygon { .. } => {}
        }
    }
    match plan.source.zone {
        Zone::Face => {}
        Zone::Rectangle { centre, size } => {
            stops.extend([-0.5, 0.5].map(|half| centre[axis] + half * size[axis]));
        }
        Zone::Disc { centre, radius } => {
            stops.extend([centre[axis] - radius, centre[axis] + radius]);
        }
    }
    stops.sort_by(f64::total_cmp);
    let extent = stops[stops.len() - 1] - stops[0];
    stops.dedup_by(|next, stop| *next - *stop < 1e-6 * extent);
    stops
}
