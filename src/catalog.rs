//! Materials, finishes, fasteners, gases, fillers: embedded data, each value with its source.
//!
//! Every kind has one TOML file beside its reader. A file is read once, when it is first asked for;
//! inside, everything is SI. Names are compared without regard to case, spaces and dashes.

mod cold;
mod families;
mod fillers;
mod finishes;
mod friction;
mod gases;
mod grades;
mod materials;
mod methods;
mod names;
mod platings;
mod raw;
mod records;
#[cfg(test)]
mod refusals;
mod seats;
mod threads;

pub use cold::{ColdFault, Property};
pub use families::{family, family_words, holding, unified};
pub use fillers::{filler, fillers};
pub use finishes::{finish, finishes};
pub use friction::{friction, friction_record};
pub use gases::{gas, gases};
pub use grades::{grade, grade_sizes, grades};
pub use materials::{fit, fit_names, material, materials};
pub use methods::{method, methods};
pub use platings::{plating, platings};
pub use raw::CatalogFault;
pub use records::*;
pub use seats::{clearance_hole, clearance_holes, seat, seat_names, seats};
pub use threads::{thread, thread_origin, threads};
