//! Results as text, JSON and tables.

pub mod arrange;
pub mod card;
pub mod catalogue;
pub mod codes;
pub mod comparison;
pub mod csv;
pub mod drivers;
pub mod fit;
pub mod json;
pub mod listing;
pub mod media;
pub mod number;
pub mod page;
pub mod sweep;
pub mod table;
pub mod text;
mod window;
