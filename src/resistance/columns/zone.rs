//! Zones of a face, with exact integrals of the columns' functions over them.

use crate::{joint, numerics::columns::Plan, resistance::columns::clip::Clip};

/// A part of a face, in the coordinates of the plan, m.
#[derive(Clone, Debug, PartialEq)]
pub enum Zone {
    /// All of it.
    Face,
    /// A rectangle parallel to the axes.
    Rectangle {
        /// Lower left corner.
        low: [f64; 2],
        /// Upper right corner.
        high: [f64; 2],
    },
    /// A disc.
    Disc {
        /// Centre.
        centre: [f64; 2],
        /// Radius.
        radius: f64,
    },
    /// A polygon; where it winds twice it is hollow.
    Polygon {
        /// Corners in turn.
        corners: Vec<[f64; 2]>,
    },
}

impl From<joint::Zone> for Zone {
    fn from(zone: joint::Zone) -> Self {
        match zone {
            joint::Zone::Face => Self::Face,
            joint::Zone::Rectangle { centre, size } => Self::Rectangle {
                low: [0, 1].map(|axis| centre[axis] - 0.5 * size[axis]),
                high: [0, 1].map(|axis| centre[axis] + 0.5 * size[axis]),
            },
            joint::Zone::Disc { centre, radius } => Self::Disc { centre, radius },
        }
    }
}

/// Part of a cell that may be missing from one that counts as filled: rounding of the clipping.
const WHOLE: f64 = 1e-9;

/// Integrals over a zone on one level of a face.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Covered {
    /// Integral of the function of every column, m².
    pub weights: Vec<f64>,
    /// Integral of its product with those of all nine neighbours, m².
    pub stencil: Vec<[f64; 9]>,
}

impl Covered {
    pub(super) fn none(plan: &Plan) -> Self {
        Self {
            weights: vec![0.0; plan.columns()],
            stencil: vec![[0.0; 9]; plan.columns()],
        }
    }

    /// Sum of the weights, m².
    pub(super) fn area(&self) -> f64 {
        self.weights.iter().sum()
    }

    /// Everything times a factor.
    pub(super) fn times(&self, factor: f64) -> Self {
        Self {
            weights: self.weights.iter().map(|w| factor * w).collect(),
            stencil: self
                .stencil
                .iter()
                .map(|row| row.map(|entry| factor * entry))
                .collect(),
        }
    }
}

impl Zone {
    /// The box that holds the zone; unbounded for a face.
    fn bounds(&self) -> [[f64; 2]; 2] {
        match self {
            Self::Face => [[f64::NEG_INFINITY, f64::INFINITY]; 2],
            Self::Rectangle { low, high } => [0, 1].map(|axis| [low[axis], high[axis]]),
            Self::Disc { centre, radius } => centre.map(|at| [at - radius, at + radius]),
            Self::Polygon { corners } => [0, 1].map(|axis| {
                let along = || corners.iter().map(|corner| corner[axis]);
                [
                    along().fold(f64::INFINITY, f64::min),
                    along().fold(f64::NEG_INFINITY, f64::max),
                ]
            }),
        }
    }

    /// Integrals over the part of the zone that is solid.
    ///
    /// Exact where cells are full. In partial cells the zone counts by the cell's share: which part
    /// of such a cell is solid does not matter there, as nothing else resolves it either.
    pub(super) fn covered(&self, plan: &Plan, shares: &[f64]) -> Covered {
        let mut covered = Covered::none(plan);
        self.each_point(plan, shares, |cell, values, area| {
            add_point(&mut covered, plan.corners(cell), (values, area));
        });
        covered
    }

    /// The same apart for cells that the zone fills and for cells that its outline cuts.
    ///
    /// In cut cells the stencil is over their narrower side, so that times a conductivity it is a
    /// film as thin as they are: all corners of a cell that is held stiffly are held, and the zone
    /// would be half a cell wider all round.
    pub(super) fn gripped(&self, plan: &Plan, shares: &[f64]) -> [Covered; 2] {
        let mut inside = vec![0.0; plan.cells()];
        self.each_point(plan, shares, |cell, _, area| inside[cell] += area);
        let mut both = [Covered::none(plan), Covered::none(plan)];
        self.each_point(plan, shares, |cell, values, area| {
            let solid = shares[cell] * plan.cell_area(cell);
            if inside[cell] > (1.0 - WHOLE) * solid {
                add_point(&mut both[0], plan.corners(cell), (values, area));
            } else {
                let [x, y] = plan.cell_sides(cell);
                let side = (x[1] - x[0]).min(y[1] - y[0]);
                let corners = plan.corners(cell);
                add_weights(&mut both[1], corners, (values, area));
                add_stencil(&mut both[1], corners, (values, area / side));
            }
        });
        both
    }

    /// Calls `visit` with the cell, the values of its four functions and the solid area of points.
    fn each_point(&self, plan: &Plan, shares: &[f64], mut visit: impl FnMut(usize, [f64; 4], f64)) {
        let clip = Clip::new(self);
        let [across, along] = self.bounds();
        for (cell, share) in shares.iter().enumerate() {
            let [x, y] = plan.cell_sides(cell);
            let apart = |side: [f64; 2], zone: [f64; 2]| side[1] <= zone[0] || zone[1] <= side[0];
            if *share <= 0.0 || apart(x, across) || apart(y, along) {
                continue;
            }
            clip.each([x, y], |point, area| {
                let s = (point[0] - x[0]) / (x[1] - x[0]);
                let t = (point[1] - y[0]) / (y[1] - y[0]);
                visit(cell, corner_values(s, t), share * area);
            });
        }
    }
}

/// The four functions of a cell: corners (0, 0), (0, 1), (1, 0), (1, 1).
pub(super) fn corner_values(s: f64, t: f64) -> [f64; 4] {
    [(1.0 - s) * (1.0 - t), (1.0 - s) * t, s * (1.0 - t), s * t]
}

/// Adds a point of a cell with its weight to all integrals.
fn add_point(covered: &mut Covered, corners: [usize; 4], point: ([f64; 4], f64)) {
    add_weights(covered, corners, point);
    add_stencil(covered, corners, point);
}

pub(super) fn add_weights(
    covered: &mut Covered,
    corners: [usize; 4],
    (values, weight): ([f64; 4], f64),
) {
    for (column, value) in corners.into_iter().zip(values) {
        covered.weights[column] += weight * value;
    }
}

pub(super) fn add_stencil(
    covered: &mut Covered,
    corners: [usize; 4],
    (values, weight): ([f64; 4], f64),
) {
    for (a, column) in corners.into_iter().enumerate() {
        for (b, value) in values.iter().enumerate() {
            // Corner b seen from corner a: one line on or back along either axis.
            let across = 1 + b / 2 - a / 2;
            let along = 1 + b % 2 - a % 2;
            covered.stencil[column][3 * across + along] += weight * values[a] * value;
        }
    }
}

#[cfg(test)]
mod tests {
    use std::f64::consts::PI;

    use super::*;
    use crate::numerics::columns::mass;

    fn plan() -> Plan {
        let lines = |n: usize| (0..=n).map(|k| (k as f64 / n as f64).powf(1.3)).collect();
        Plan::new(lines(7), lines(9))
    }

    // Closed forms; rounding of some hundred terms.
    #[test]
    fn zones_have_their_area_and_centre() {
        let plan = plan();
        let zones = [
            (Zone::Face, 1.0, [0.5, 0.5]),
            (
                Zone::Rectangle {
                    low: [0.13, 0.2],
                    high: [0.61, 1.4],
                },
                0.48 * 0.8,
                [0.37, 0.6],
            ),
            (
                Zone::Disc {
                    centre: [0.45, 0.52],
                    radius: 0.31,
                },
                PI * 0.31 * 0.31,
                [0.45, 0.52],
            ),
            (
                Zone::Disc {
                    centre: [0.0, 0.52],
                    radius: 0.31,
                },
                0.5 * PI * 0.31 * 0.31,
                [4.0 * 0.31 / (3.0 * PI), 0.52],
            ),
            (
                Zone::Polygon {
                    corners: vec![[0.1, 0.1], [0.8, 0.2], [0.3, 0.9]],
                },
                0.5 * (0.7 * 0.8 - 0.2 * 0.1),
                [0.4, 0.4],
            ),
        ];
        for (zone, area, centre) in zones {
            let covered = zone.covered(&plan, &vec![1.0; plan.cells()]);
            assert!((covered.area() - area).abs() < 1e-9 * area, "{zone:?}");
            for (axis, centre) in centre.iter().enumerate() {
                let moment: f64 = covered
                    .weights
                    .iter()
                    .enumerate()
                    .map(|(column, weight)| weight * plan.place(column)[axis])
                    .sum();
                assert!((moment - centre * area).abs() < 1e-9, "{zone:?}");
            }
            // The functions of a cell add up to one, so the rows add up to the weights.
            for (row, weight) in covered.stencil.iter().zip(&covered.weights) {
                assert!((row.iter().sum::<f64>() - weight).abs() < 1e-14, "{zone:?}");
            }
        }
    }

    #[test]
    fn a_whole_face_has_the_mass_of_the_columns() {
        let plan = plan();
        let shares: Vec<f64> = (0..plan.cells())
            .map(|cell| (cell % 3) as f64 / 2.0)
            .collect();
        let covered = Zone::Face.covered(&plan, &shares);
        for (row, other) in covered.stencil.iter().zip(mass(&plan, &shares)) {
            for (entry, other) in row.iter().zip(other) {
                assert!((entry - other).abs() < 1e-16);
            }
        }
    }
}
