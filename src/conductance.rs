//! Contact pressure to local conductance.
