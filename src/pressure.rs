//! Clamp force to contact pressure.

mod beta;
pub mod cone;
pub mod round;

pub use cone::{Cone, Pair, Profile, cone};
