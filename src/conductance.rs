//! Contact pressure to local conductance.
//!
//! An [`Interface`] is what stands between two faces; [`Interface::prepare`] works out everything
//! that does not depend on pressure, and the [`Local`] it returns answers for one pressure at a
//! time.
//!
//! The parts act side by side or in series:
//!
//! ```text
//! h = 1 / (1/(h_spots + h_gas + h_radiation) + Σ t/k)     h_spots, h_gas, h_radiation, t/k in SI
//! ```
//!
//! | part | law | file |
//! |---|---|---|
//! | solid spots | elastic-plastic, plastic or elastic, by exact integrals | [`spots`] |
//! | gas in the gap | with rarefaction, at the local separation | [`gas`] |
//! | radiation | grey faces | [`radiation`] |
//! | paste, pad, foil, layer | by kind, in place of spots and gas | [`filler`] |
//! | plating, anodic film | effective hardness and conductivity, or in series | [`film`] |
//! | crowned faces without bolts | convergence towards the contact | [`flatness`] |

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
