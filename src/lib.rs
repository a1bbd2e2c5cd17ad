//! Torque to thermal resistance of a bolted joint.
//!
//! The modules stand in the order in which force and heat flow; each uses only those above it.

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
