//! The whole chain on one page.

mod results;

pub use results::*;
