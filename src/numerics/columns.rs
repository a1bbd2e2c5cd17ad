//! Matrices over a plan of columns: plane grid lines times a polynomial through the thickness.
//!
//! ```text
//! u(x, y, z) = Σ_i Σ_a N_i(x, y) Z_a(z) U_ia      N bilinear on a plan, Z Lagrange on few nodes
//! matrix     = Σ (plan stencil of nine neighbours) ⊗ (small matrix through the thickness)
//! ```
//!
//! A *column* stands on each crossing of two grid lines. Its unknowns fall into *groups* that only
//! *ties* couple: one group for each body, one more for each loose unknown. A body is a stack of
//! bonded *layers*, upwards, each with its own share of every cell that it fills; neighbours share
//! the node between them. In a group of `n` nodes the unknown of component `c` at node `z` stands at
//! `c · n + z`.
//!
//! How a scalar operator is made, conduction through two plates with resistance between them:
//!
//! ```
//! use ringsum::numerics::columns::{Conductor, Layer, Operator, Plan, Region, Scalar, Tie, lumped, mass};
//! use ringsum::numerics::multigrid::{Coarsening, Multigrid, conjugate_gradients};
//!
//! let line = |n: usize| (0..=n).map(|k| k as f64 * 0.01).collect::<Vec<f64>>();
//! let plan = Plan::new(line(8), line(6));
//! let cover = Region::sample(&plan, &|[x, y]| (x - 0.04).hypot(y - 0.03) > 0.006);
//! let shares = cover.shares();
//! // Two groups of three nodes each: one quadratic element through either plate.
//! let mut operator = Operator::<Scalar>::new(&plan, &[3, 3]);
//! for group in 0..2 {
//!     operator.add_layer(&Layer {
//!         shares: &shares, group, first_node: 0, heights: &[0.005], degree: 2,
//!         constants: Scalar { along: [167.0, 167.0], through: 167.0 },
//!     });
//! }
//! // Upper plate is group 0; its lowest node meets the top of group 1 with 1000 W/(m² K).
//! let weights = cover.weights(&plan);
//! let meeting: Vec<f64> = weights.iter().map(|w| 1000.0 * w).collect();
//! operator.add_tie(Tie { plus: operator.unknown(0, 0, 0), minus: Some(operator.unknown(1, 0, 2)), stencil: lumped(&meeting) });
//! // A film of 500 W/(m² K) below, with the mass stencil of the face.
//! let film = mass(&plan, &shares).into_iter().map(|row| row.map(|m| 500.0 * m)).collect();
//! operator.add_tie(Tie { plus: operator.unknown(1, 0, 0), minus: None, stencil: film });
//! // A bolt as a rank-one conductor: strength times the square of a weighted difference.
//! let here = operator.place(20, operator.unknown(0, 0, 2));
//! let there = operator.place(20, operator.unknown(1, 0, 0));
//! operator.conductors.push(Conductor { entries: vec![(here, 1.0), (there, -1.0)], strength: 0.02 });
//! let mut load = operator.zeros();
//! for (column, weight) in weights.iter().enumerate() {
//!     load[operator.place(column, operator.unknown(0, 0, 2))] = 1e4 * weight;
//! }
//! let mut multigrid = Multigrid::new(&operator, Coarsening::FULL)?;
//! let mut rise = operator.zeros();
//! conjugate_gradients(&operator, &mut multigrid, (&load, &mut rise), &Default::default())?;
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

mod form;
mod kernel;
mod lines;
mod mirror;
mod operator;
mod plan;
mod region;
mod stencil;
mod through;

pub use form::{Form, Scalar, Solid};
pub use lines::{Fine, Stop, lines};
pub use mirror::Mirror;
pub use operator::{Conductor, Layer, Operator, Tie};
pub use plan::Plan;
pub use region::{Disc, Region};
pub use stencil::{gradient, lumped, mass, with_floor};
pub use through::{Element, node_heights, span_loads};

pub(crate) use form::{LANES, MOST_STENCILS, Square};
pub(crate) use kernel::{Coupling, Matrix, Neighbour};

#[cfg(test)]
mod bending;
#[cfg(test)]
mod tests;
