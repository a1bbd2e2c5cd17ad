//! The chain against joints that others measured or tabulated, with catalogue inputs and no tuning.
//!
//! `data/bolted_cases.toml` holds the cases with the status of every value, `data/joints/measured/` a joint
//! file for each that can be expressed; what is assumed stands in its head. All are run on the elastic
//! field at `fast`.

#[path = "validation_measured/contact.rs"]
mod contact;
#[path = "evidence/note.rs"]
mod evidence;
#[path = "shared/joints.rs"]
mod joints;
#[path = "validation_measured/table.rs"]
mod table;
#[path = "validation_measured/trends.rs"]
mod trends;

use joints::fast;
use ringsum::{
    estimate::{CaseResult, Options, Realisation},
    joint::Joint,
    resistance::Path,
    uncertainty,
};

/// A joint with its first case on the elastic field at `fast`.
fn solved(joint: &Joint, draws: u32) -> CaseResult {
    let chain = fast(joint);
    let options = Options { draws, seed: 1 };
    let found = uncertainty::along(&chain, &options).expect("a number");
    found.cases.into_iter().next().expect("a case")
}

/// Nominal resistances alone: no coarser level, no cone beside them.
fn path(joint: &Joint) -> Path {
    let chain = fast(joint);
    let state = chain.state(0, &Realisation::default());
    state.expect("a state").path
}
