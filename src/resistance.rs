//! Local conductance to the resistances of the joint.

pub mod region;
