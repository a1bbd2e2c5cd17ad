//! Edges of a body: integrals of the columns' functions along straight sides and round rims.

use std::f64::consts::{PI, TAU};

use crate::{
    numerics::{columns::Plan, quadrature::gauss_legendre},
    resistance::columns::{
        Edge, Rim,
        clip::{parts, scaled},
        zone::{Covered, add_stencil, add_weights, corner_values},
    },
};

/// Points on each arc within a cell; the integrand is smooth there.
const ALONG_ARC: usize = 4;

impl Rim {
    /// Integrals along the rim, per height: weights in m; the stencil in m per m of cell, so that
    /// times a conductivity it is a film as thin as the cells.
    ///
    /// A straight side lies on the outermost cells that hold anything and couples each column to
    /// itself alone. A round rim runs through cells; a film as thin as a fraction of them is as stiff
    /// as they can bear.
    pub(super) fn covered(&self, plan: &Plan, shares: &[f64]) -> Covered {
        let mut covered = Covered::none(plan);
        match self {
            Self::Straight(edge) => straight(*edge, plan, shares, &mut covered),
            Self::Round { centre, radius } => round((*centre, *radius), plan, &mut covered),
        }
        covered
    }
}

fn straight(edge: Edge, plan: &Plan, shares: &[f64], covered: &mut Covered) {
    let rows = plan.y.len() - 1;
    let (across_x, upper) = match edge {
        Edge::West => (true, 0),
        Edge::East => (true, 1),
        Edge::South => (false, 0),
        Edge::North => (false, 1),
    };
    let line = |cell: usize| if across_x { cell / rows } else { cell % rows };
    let filled = || (0..shares.len()).filter(|cell| shares[*cell] > 0.0);
    let outermost = if upper == 1 {
        filled().map(line).max()
    } else {
        filled().map(line).min()
    };
    for cell in filled().filter(|cell| Some(line(*cell)) == outermost) {
        let [x, y] = plan.cell_sides(cell);
        let (long, deep) = if across_x { (y, x) } else { (x, y) };
        let (length, depth) = (long[1] - long[0], deep[1] - deep[0]);
        let corners = plan.corners(cell);
        let ends = if across_x {
            [corners[2 * upper], corners[2 * upper + 1]]
        } else {
            [corners[upper], corners[upper + 2]]
        };
        for column in ends {
            covered.weights[column] += 0.5 * length * shares[cell];
            covered.stencil[column][4] += 0.5 * length * shares[cell] / depth;
        }
    }
}

fn round((centre, radius): ([f64; 2], f64), plan: &Plan, covered: &mut Covered) {
    let mut breaks = vec![-PI, PI];
    for (axis, lines) in [&plan.x, &plan.y].into_iter().enumerate() {
        for line in lines {
            let along = (line - centre[axis]) / radius;
            if along.abs() <= 1.0 {
                let angles = if axis == 0 {
                    [along.acos(), -along.acos()]
                } else {
                    [along.asin(), PI - along.asin()]
                };
                breaks.extend(angles.map(|angle| (angle + PI).rem_euclid(TAU) - PI));
            }
        }
    }
    let rule = gauss_legendre(ALONG_ARC);
    for part in parts(breaks, [-PI, PI]) {
        for (angle, weight) in scaled(&rule, part) {
            let point = [
                centre[0] + radius * angle.cos(),
                centre[1] + radius * angle.sin(),
            ];
            let Some(cell) = plan.cell_at(point) else {
                continue;
            };
            let [x, y] = plan.cell_sides(cell);
            let sides = [x[1] - x[0], y[1] - y[0]];
            let values = corner_values((point[0] - x[0]) / sides[0], (point[1] - y[0]) / sides[1]);
            let corners = plan.corners(cell);
            let length = radius * weight;
            add_weights(covered, corners, (values, length));
            add_stencil(covered, corners, (values, length / sides[0].min(sides[1])));
        }
    }
}
