//! Mathematics that knows no physics.

pub mod block_grid;
pub mod block_tridiagonal;
