//! Mathematics that knows no physics.
