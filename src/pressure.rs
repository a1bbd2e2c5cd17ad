//! Clamp force to contact pressure.

mod beta;
pub mod cone;
pub mod elastic;
pub mod round;

pub use cone::{Cone, Pair, Profile, cone};
