//! Torque to clamp force, its scatter, its losses and what the bolt bears.
//!
//! The files stand in the order of the thought: [`torque`] balances a wrench against pitch and
//! friction, [`force`] reads a fastener and gives its clamp force at any place of its scatter,
//! [`strength`] and [`engagement`] say what bolt and threads bear, [`mod@limits`] gathers that into the
//! largest torque, [`resilience`] (and the textbook's [`frusta`])
//! tells how soft bolt and plates are, [`mod@stack`] applies that to a joint, [`losses`] what is left in
//! service, [`springs`] what keeps it, [`external`] what a load from outside does to it, [`brittle`]
//! what a ceramic or glass plate bears, and [`cautions`] what the engineer must hear.

pub mod brittle;
pub mod cautions;
pub mod engagement;
pub mod external;
#[cfg(test)]
mod fixture;
pub mod force;
pub mod frusta;
pub mod limits;
pub mod losses;
pub mod resilience;
pub mod springs;
pub mod stack;
pub mod strength;
pub mod torque;

pub use cautions::{
    Group, group_cautions, hardly_clamped, opened, over_in_service, parts, springs_flat,
    window_cautions,
};
pub use external::{ServiceLoad, Shared};
pub use force::{Place, clamp_force, force_band};
pub use limits::{
    LimitUse, Supports, largest_torque, limit_torques, limits, limits_in_service, strength_use,
};
pub use losses::{Elasticity, Losses, force_in_service};
pub use stack::{Stack, Strains, guide_settling, stack};
