//! Points and weights that integrate over the part of a cell inside a zone.

use crate::{numerics::quadrature::gauss_legendre, resistance::columns::Zone};

/// Products of two bilinear functions are quadratic in each direction: two points are exact.
const ACROSS: usize = 2;
/// Between two corners of the outline the clipped integrand is smooth; its error is below 1e-10.
const ALONG: usize = 10;

/// The rules of one zone.
#[derive(Clone, Debug)]
pub(super) struct Clip<'a> {
    zone: &'a Zone,
    across: Vec<(f64, f64)>,
    along: Vec<(f64, f64)>,
}

impl<'a> Clip<'a> {
    pub(super) fn new(zone: &'a Zone) -> Self {
        Self {
            zone,
            across: gauss_legendre(ACROSS),
            along: gauss_legendre(ALONG),
        }
    }

    /// Calls `visit` with points of the cell inside the zone and their areas.
    pub(super) fn each(&self, [x, y]: [[f64; 2]; 2], mut visit: impl FnMut([f64; 2], f64)) {
        match self.zone {
            Zone::Face => self.box_points([x, y], &mut visit),
            Zone::Rectangle { low, high } => {
                let cut =
                    |side: [f64; 2], axis: usize| [side[0].max(low[axis]), side[1].min(high[axis])];
                self.box_points([cut(x, 0), cut(y, 1)], &mut visit);
            }
            Zone::Disc { centre, radius } => {
                self.disc_points([x, y], (*centre, *radius), &mut visit);
            }
            Zone::Polygon { corners } => self.polygon_points([x, y], corners, &mut visit),
        }
    }

    fn box_points(&self, [x, y]: [[f64; 2]; 2], visit: &mut impl FnMut([f64; 2], f64)) {
        if x[0] < x[1] {
            for (at, weight) in scaled(&self.across, x) {
                self.line_points(at, weight, y, visit);
            }
        }
    }

    /// Points on a line of constant x between two heights.
    fn line_points(&self, x: f64, width: f64, y: [f64; 2], visit: &mut impl FnMut([f64; 2], f64)) {
        if y[0] < y[1] {
            for (at, weight) in scaled(&self.across, y) {
                visit([x, at], width * weight);
            }
        }
    }

    /// x = centre + radius · sin θ makes the outline smooth at its ends too.
    fn disc_points(
        &self,
        [x, y]: [[f64; 2]; 2],
        ([cx, cy], radius): ([f64; 2], f64),
        visit: &mut impl FnMut([f64; 2], f64),
    ) {
        let angle = |at: f64| ((at - cx) / radius).clamp(-1.0, 1.0).asin();
        let ends = [angle(x[0]), angle(x[1])];
        let mut breaks = vec![ends[0], ends[1]];
        for side in y {
            let cosine = ((side - cy) / radius).abs();
            if cosine < 1.0 {
                breaks.extend([cosine.acos(), -cosine.acos()]);
            }
        }
        for part in parts(breaks, ends) {
            for (theta, weight) in scaled(&self.along, part) {
                let half = radius * theta.cos();
                let span = [y[0].max(cy - half), y[1].min(cy + half)];
                let at = cx + radius * theta.sin();
                self.line_points(at, weight * half, span, visit);
            }
        }
    }

    fn polygon_points(
        &self,
        [x, y]: [[f64; 2]; 2],
        corners: &[[f64; 2]],
        visit: &mut impl FnMut([f64; 2], f64),
    ) {
        let edges = || corners.iter().zip(corners.iter().cycle().skip(1));
        let mut breaks = vec![x[0], x[1]];
        for (a, b) in edges() {
            breaks.push(a[0]);
            for side in y {
                if (a[1] - side) * (b[1] - side) < 0.0 {
                    breaks.push(a[0] + (b[0] - a[0]) * (side - a[1]) / (b[1] - a[1]));
                }
            }
        }
        for part in parts(breaks, x) {
            for (at, weight) in scaled(&self.along, part) {
                let mut heights: Vec<f64> = edges()
                    .filter(|(a, b)| (a[0] < at) != (b[0] < at))
                    .map(|(a, b)| a[1] + (b[1] - a[1]) * (at - a[0]) / (b[0] - a[0]))
                    .collect();
                heights.sort_by(f64::total_cmp);
                for pair in heights.chunks_exact(2) {
                    let span = [y[0].max(pair[0]), y[1].min(pair[1])];
                    self.line_points(at, weight, span, visit);
                }
            }
        }
    }
}

/// A rule on [−1, 1] brought to an interval.
pub(super) fn scaled(rule: &[(f64, f64)], ends: [f64; 2]) -> impl Iterator<Item = (f64, f64)> {
    let (middle, half) = (0.5 * (ends[0] + ends[1]), 0.5 * (ends[1] - ends[0]));
    rule.iter()
        .map(move |(at, weight)| (middle + half * at, half * weight))
}

/// The parts of an interval between its breaks.
pub(super) fn parts(mut breaks: Vec<f64>, ends: [f64; 2]) -> impl Iterator<Item = [f64; 2]> {
    breaks.retain(|at| ends[0] <= *at && *at <= ends[1]);
    breaks.sort_by(f64::total_cmp);
    let last = breaks.len().saturating_sub(1);
    (0..last)
        .map(move |k| [breaks[k], breaks[k + 1]])
        .filter(|part| part[0] < part[1])
}
