//! The draws: compiled plan against the chain itself, surfaces against solved draws, bands against
//! truths that are known.

#[path = "validation_draws/bands.rs"]
mod bands;
#[path = "validation_draws/bent.rs"]
mod bent;
#[path = "validation_draws/coverage.rs"]
mod coverage;
#[path = "validation_draws/heat.rs"]
mod heat;
#[path = "shared/joints.rs"]
mod joints;
#[path = "validation_draws/plan.rs"]
mod plan;
#[path = "validation_draws/remade.rs"]
mod remade;
