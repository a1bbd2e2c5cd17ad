//! Mathematics that knows no physics.

pub mod banded;
pub mod block_grid;
pub mod block_tridiagonal;
pub mod bordered;
pub mod bracket;
pub mod columns;
pub mod complementarity;
pub mod condensation;
pub mod distribution;
pub mod elements;
pub mod grading;
mod inner;
pub mod interpolation;
pub mod multigrid;
pub mod polygon;
pub mod quadrature;
pub mod roots;
pub mod sampling;
pub mod scattered;
pub mod special;
pub mod surface;
pub mod test_statistics;
