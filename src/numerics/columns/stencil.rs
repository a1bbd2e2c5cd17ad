//! Stencils of nine neighbours from the shares of the cells around every column.

use rayon::prelude::*;

use crate::numerics::columns::{Form, Plan};

/// Share of an empty cell that has to hold two others together.
const FLOOR: f64 = 1e-4;

/// Products of the matrices along x and along y for one pair of corners of a cell of share 1.
#[derive(Clone, Copy, Debug, Default)]
pub struct Products {
    /// `∫ N_a,x N_b,x`.
    pub xx: f64,
    /// `∫ N_a,y N_b,y`.
    pub yy: f64,
    /// `∫ N_a,x N_b,y`.
    pub xy: f64,
    /// `∫ N_a,y N_b,x`.
    pub yx: f64,
    /// `∫ N_a N_b`.
    pub mass: f64,
    /// The same with one midpoint along x.
    pub mass_x: f64,
    /// The same with one midpoint along y.
    pub mass_y: f64,
    /// `∫ N_a,x N_b`.
    pub x_value: f64,
    /// `∫ N_a N_b,x`.
    pub value_x: f64,
    /// `∫ N_a,y N_b`.
    pub y_value: f64,
    /// `∫ N_a N_b,y`.
    pub value_y: f64,
}

/// Matrices of one interval for one pair of its ends.
struct Ends {
    mass: f64,
    reduced: f64,
    stiffness: f64,
    slope_value: f64,
    value_slope: f64,
}

impl Ends {
    fn of(length: f64, a: usize, b: usize) -> Self {
        let sign = |end: usize| if end == 0 { -0.5 } else { 0.5 };
        Self {
            mass: length / if a == b { 3.0 } else { 6.0 },
            reduced: length / 4.0,
            stiffness: if a == b { 1.0 } else { -1.0 } / length,
            slope_value: sign(a),
            value_slope: sign(b),
        }
    }
}

impl Products {
    fn of([width, depth]: [f64; 2], [p, q]: [usize; 2], [r, s]: [usize; 2]) -> Self {
        let (x, y) = (Ends::of(width, p, r), Ends::of(depth, q, s));
        Self {
            xx: x.stiffness * y.mass,
            yy: x.mass * y.stiffness,
            xy: x.slope_value * y.value_slope,
            yx: x.value_slope * y.slope_value,
            mass: x.mass * y.mass,
            mass_x: x.reduced * y.mass,
            mass_y: x.mass * y.reduced,
            x_value: x.slope_value * y.mass,
            value_x: x.value_slope * y.mass,
            y_value: x.mass * y.slope_value,
            value_y: x.mass * y.value_slope,
        }
    }
}

/// Calls `visit` with every neighbour 0..9 of a column, the products towards it and the cell.
fn each_product(plan: &Plan, column: usize, mut visit: impl FnMut(usize, usize, Products)) {
    let (nx, ny) = (plan.x.len(), plan.y.len());
    let (i, j) = (column / ny, column % ny);
    for (p, q) in [(0, 0), (0, 1), (1, 0), (1, 1)] {
        // The column is corner (p, q) of this cell.
        if i < p || j < q || i - p + 1 >= nx || j - q + 1 >= ny {
            continue;
        }
        let cell = (i - p) * (ny - 1) + j - q;
        let [x, y] = plan.cell_sides(cell);
        let sides = [x[1] - x[0], y[1] - y[0]];
        for (r, s) in [(0, 0), (0, 1), (1, 0), (1, 1)] {
            let neighbour = 3 * (r + 1 - p) + s + 1 - q;
            visit(neighbour, cell, Products::of(sides, [p, q], [r, s]));
        }
    }
}

/// Coefficients of a form: for every column and each of its nine neighbours in turn.
pub(super) fn coefficients<F: Form>(plan: &Plan, shares: &[f64], constants: F) -> Vec<f64> {
    let width = F::STENCILS;
    let mut all = vec![0.0; plan.columns() * 9 * width];
    all.par_chunks_mut(9 * width)
        .with_min_len(64)
        .enumerate()
        .for_each(|(column, own)| {
            each_product(plan, column, |neighbour, cell, products| {
                if shares[cell] > 0.0 {
                    let values = constants.stencils(&products);
                    let row = &mut own[neighbour * width..][..width];
                    for (entry, value) in row.iter_mut().zip(values) {
                        *entry += shares[cell] * value;
                    }
                }
            });
        });
    all
}

fn single(plan: &Plan, shares: &[f64], value: impl Fn(&Products) -> f64) -> Vec<[f64; 9]> {
    let mut rows = vec![[0.0; 9]; plan.columns()];
    for (column, row) in rows.iter_mut().enumerate() {
        each_product(plan, column, |neighbour, cell, products| {
            row[neighbour] += shares[cell] * value(&products);
        });
    }
    rows
}

/// `∫ N_a N_b` over the filled shares: a film on a face.
pub fn mass(plan: &Plan, shares: &[f64]) -> Vec<[f64; 9]> {
    single(plan, shares, |products| products.mass)
}

/// `∫ ∇N_a · ∇N_b` over the filled shares: a membrane.
pub fn gradient(plan: &Plan, shares: &[f64]) -> Vec<[f64; 9]> {
    single(plan, shares, |products| products.xx + products.yy)
}

/// A stencil that couples every column to itself alone.
pub fn lumped(weights: &[f64]) -> Vec<[f64; 9]> {
    weights
        .iter()
        .map(|weight| {
            let mut row = [0.0; 9];
            row[4] = *weight;
            row
        })
        .collect()
}

/// Shares with 1e-4 in the empty cells of columns around which the filled ones touch only corner to
/// corner: without it the two parts would turn freely about such a column.
///
/// Columns all of whose cells are empty have no equation: their unknowns stay zero.
pub fn with_floor(plan: &Plan, shares: &[f64]) -> Vec<f64> {
    let mut floored = shares.to_vec();
    let rows = plan.y.len() - 1;
    for i in 1..plan.x.len() - 1 {
        for j in 1..rows {
            let first = (i - 1) * rows + j - 1;
            let around = [first, first + 1, first + rows, first + rows + 1];
            let filled = around.map(|cell| shares[cell] > 0.0);
            if filled == [true, false, false, true] || filled == [false, true, true, false] {
                for cell in around {
                    floored[cell] = floored[cell].max(FLOOR);
                }
            }
        }
    }
    floored
}
