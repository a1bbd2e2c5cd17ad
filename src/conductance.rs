//! Contact pressure to local conductance.
//!
//! An [`Interface`] is what stands between two faces; [`Interface::prepare`] works out everything
//! that does not depend on pressure, and the [`Local`] it returns answers for one pressure at a
//! time.

mod curve;
pub mod filler;
pub mod film;
pub mod flatness;
pub mod gas;
mod interface;
mod local;
pub mod radiation;
pub mod spots;

pub use curve::Curve;
pub use gas::GapGas;
pub use interface::{Face, Hardness, Interface, Layer};
pub use local::{Conductance, Local};

#[cfg(test)]
mod properties;
