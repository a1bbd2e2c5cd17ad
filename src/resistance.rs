//! Local conductance to the resistances of the joint.
//!
//! `cells` cuts the plates into one cell per bolt and its rings, once per geometry; `path` solves
//! the heat through them for one set of forces and conductances; `field` reads the pressure field.

pub mod annulus;
pub mod cells;
pub mod field;
pub mod network;
pub mod path;
pub mod region;
mod rings;

pub use cells::{Cells, Plan, Site, cells};
pub use field::RingRow;
pub use path::{Load, Path};
