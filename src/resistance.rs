//! Local conductance to the resistances of the joint.

pub mod network;
pub mod region;
