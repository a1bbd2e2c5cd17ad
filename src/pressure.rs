//! Clamp force to contact pressure.
