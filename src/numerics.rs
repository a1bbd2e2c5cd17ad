//! Mathematics that knows no physics.

pub mod block_tridiagonal;
