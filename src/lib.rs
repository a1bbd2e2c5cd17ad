//! Torque to thermal resistance of a bolted joint, with a low and a high that can be defended.
//!
//! This is the handbook of the program. It reads in the order in which force and heat flow; each
//! module uses only those above it. Every law stands where it is computed, with its equation, its
//! symbols in SI units, the range it holds in, its source, and the test that checked it. Where a source
//! is given from memory it says so; a judgement of this program says that. `ringsum explain` tells the
//! same laws at the terminal, from [`diagnostic::registry`].
//!
//! # The chain
//!
//! 1. **What is joined.** [`catalog`] holds materials, finishes, threads, grades, friction, gases and
//!    fillers, each value with its spread, status and source. [`joint`] turns a file into a checked
//!    [`joint::Joint`]: SI inside, nothing missing, nothing guessed in silence. [`units`] reads and writes
//!    the units of the text, [`diagnostic`] tells faults and cautions.
//! 2. **Torque to clamp force.** [`preload`]: [`preload::torque`] balances the wrench against pitch and
//!    friction, [`preload::force`] gives the force at any place of its scatter, [`preload::strength`],
//!    [`preload::engagement`] and [`mod@preload::limits`] say what bolt, thread and seats bear,
//!    [`preload::resilience`] and [`preload::losses`] what is left in service, [`preload::external`] what a
//!    load from outside takes.
//! 3. **Clamp force to pressure and gap.** [`pressure`]: [`pressure::elastic`] solves the contact of the
//!    whole plates, [`pressure::round`] that of one bolt in round plates, [`mod@pressure::cone`] is the
//!    closed form for a quick look.
//! 4. **Pressure and gap to local conductance.** [`conductance`]: [`conductance::spots`] where metal
//!    touches, [`conductance::gas`] and [`conductance::radiation`] across the gap,
//!    [`conductance::filler`] and [`conductance::film`] for what lies between; [`conductance::Local`]
//!    is their sum at one pressure.
//! 5. **Local conductance to resistance.** [`resistance`]: [`resistance::columns`] solves the heat in three
//!    dimensions, [`resistance::round`] in radius and height, [`resistance::network`] and
//!    [`mod@resistance::plan_grid`] are the networks beside the cone. [`resistance::Path`] carries the four
//!    results, each between named planes.
//! 6. **The chain on one page.** [`estimate`]: [`estimate::Chain`] takes a joint through all of it, and
//!    gathers cautions and assumptions.
//! 7. **Low, high, and what drives them.** [`uncertainty`]: whole joints are drawn ([`uncertainty::Draws`]),
//!    inputs ranked ([`uncertainty::Ranking`]), joints compared with common numbers
//!    ([`uncertainty::Comparison`]), torques swept ([`uncertainty::torque_sweep`]).
//! 8. **Own measurements and own layouts.** [`fit`] turns readings into a law with its scatter, or finds one
//!    unknown of the model; [`layout`] searches for the pattern of bolts.
//! 9. **Telling it.** [`report`] has the words, [`figures`] the drawings, [`cli`] the commands: the only
//!    place that reads, writes and prints.
//!
//! [`numerics`] knows no physics: quadrature, roots, sparse systems, sampling. Physics in turn reads no
//! files, prints nothing and draws no random numbers; the tests hold both.
//!
//! # In a program of your own
//!
//! ```
//! use ringsum::{estimate::Options, joint, uncertainty};
//!
//! let text = include_str!(concat!(env!("CARGO_MANIFEST_DIR"), "/joints/rig_coupon.toml"));
//! let joint = joint::read(text).expect("a good joint");
//! let estimate = uncertainty::estimate(&joint, &Options { draws: 0, seed: 1 }).expect("a number");
//! let whole = estimate.cases[0].results.source_to_sink.resistance.nominal;
//! assert!(whole > 0.0, "K/W, on the closed-form cone");
//! ```

pub mod numerics;

pub mod units;

pub mod diagnostic;

pub mod catalog;

pub mod joint;

pub mod preload;

pub mod pressure;

pub mod conductance;

pub mod resistance;

pub mod estimate;

pub mod uncertainty;

pub mod fit;

pub mod layout;

pub mod report;

pub mod figures;

pub mod cli;

/// Configuration of property tests: so many cases, the same in every run.
#[cfg(test)]
fn fixed_cases(cases: u32) -> proptest::test_runner::Config {
    proptest::test_runner::Config {
        cases,
        rng_seed: proptest::test_runner::RngSeed::Fixed(1),
        failure_persistence: None,
        ..proptest::test_runner::Config::default()
    }
}
