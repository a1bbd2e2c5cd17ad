//! Drawings from results only.
