//! Other layouts of the fasteners of a joint: search, screening, the exact answer for the best.
//!
//! A space of layouts is screened on a linear model of the plates that is solved once per place;
//! the best are solved again on the elastic field. Every step is cut into units that know nothing
//! of each other, so that a search can stop after any unit, go on later, and run on any number of
//! threads with the same answer.

mod alternatives;
mod answer;
mod bolt;
mod constraints;
mod digest;
mod free;
mod goal;
mod patterns;
mod refine;
mod rewritten;
mod search;
mod sheets;
mod size;
mod solved;

pub use alternatives::{Again, alternatives};
pub use answer::{Answer, Row, Verdict};
pub use constraints::{Constraints, Defaults};
pub use digest::digest;
pub use goal::{Goal, Measure, Target};
pub use patterns::{Pattern, rule_patterns};
pub use rewritten::{Fasten, rewritten};
pub use search::{Layout, Progress, Search, State, Stopped, Task};
pub use sheets::Sheets;
pub use size::{Size, worst_case};
pub use solved::{InCase, Solution, banded, solved};

/// Why a search cannot run.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Failure {
    /// The chain refuses the joint.
    #[error(transparent)]
    Chain(#[from] crate::estimate::Failure),
    /// The goal needs a requirement.
    #[error("fewest bolts and least mass need a requirement to meet; the joint states none")]
    NoRequirement,
    /// The requirement limits a rise, and no heat is stated.
    #[error("the requirement limits a rise, but the joint states no heat")]
    NoHeat,
    /// The requirement counts from the coolant, which the screening does not know.
    #[error(
        "the requirement counts from the coolant, and layouts are compared above the sink surface"
    )]
    FromCoolant,
    /// A size makes a joint that cannot be read.
    #[error("{size} makes a joint that cannot be: {fault}")]
    Size {
        /// What is tried.
        size: String,
        /// The first fault.
        fault: String,
    },
    /// No size bears its torque.
    #[error("no fastener bears its torque: {0}")]
    Overstressed(String),
    /// No layout keeps the distances.
    #[error("no layout keeps edge distance, pitch and keep-out zones: {0}")]
    NoLayout(String),
    /// The plates have no path for the heat.
    #[error("the plates cannot be screened: no heat flows through them")]
    NoPath,
    /// The file has no fastener table that can be changed.
    #[error("the first fastener cannot be rewritten: {0}")]
    Rewriting(String),
}
