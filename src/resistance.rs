//! Local conductance to the resistances of the joint.
//!
//! Four results, each between named planes ([`Path`]):
//!
//! ```text
//! contact         G = ∫ h dA                       faces isothermal; an upper bound of conductance
//! node to node    R = (T̄₁ − T̄₂)/Q                  mean temperatures of the whole plates
//! added by joint  R = R(path) − R(path, perfect)   what the joint costs
//! source to sink  R = (T̄_source − T̄_sink)/Q        the requirement
//! ```
//!
//! `cells` cuts the plates into one cell per bolt and its rings, once per geometry; `path` solves
//! the heat through them for one set of forces and conductances; `field` reads the pressure field.
//! `plan_grid` solves the heat with the plates whole, for several bolts; `calibration` carries its
//! answer over to many draws of the fast cells. `round` solves one bolt in round plates in full,
//! `columns` any stack of bodies in three dimensions.

pub mod annulus;
mod calibration;
pub mod cells;
pub mod column;
pub mod columns;
mod failure;
pub mod field;
mod neighbours;
pub mod network;
pub mod path;
pub mod plan_grid;
pub mod region;
mod rings;
pub mod round;

#[cfg(test)]
mod fixtures;

pub use calibration::Calibration;
pub use cells::{Cells, Hole, Plan, Site, cells};
pub use failure::Failure;
pub use field::RingRow;
pub use path::{Load, Path};
pub use plan_grid::{Perfect, PlanGrid, plan_grid};
