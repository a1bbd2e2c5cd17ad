//! Results as JSON: a contract whose keys may be added to, never changed. SI, unrounded.
//!
//! What is printed is made of types; `schema` derives the schema of the contract from them.

mod beside;
mod comparison;
mod estimate;
mod pressure;
mod schema;
mod shapes;
mod sweep;
mod temperatures;
mod window;

pub use beside::{media, rings, verification};
pub use comparison::comparison;
pub use estimate::estimate;
pub use schema::{COMMANDS, schema};
pub use sweep::torque;

pub(super) use comparison::CompareResult;
pub(super) use estimate::EstimateResult;
pub(super) use pressure::differences;
pub(super) use shapes::{CautionTold, HEAD, Head, bound, cautions};
pub(super) use sweep::TorqueResult;

/// Number of the file format and of this contract.
pub const FORMAT: u32 = 1;
