//! The joint file, and the checked joint it describes.

pub mod checked;

pub use checked::*;
