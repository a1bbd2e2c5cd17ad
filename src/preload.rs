//! Torque to clamp force, its scatter, its losses and what the bolt bears.
