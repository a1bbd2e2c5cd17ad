//! Catalogue records as rows for `list`: working units in the table, SI and sources in JSON.

mod fasteners;
mod media;
mod plates;

pub use fasteners::{friction, grades, heads, holes, methods, threads};
pub use media::{fillers, gases, platings};
pub use plates::{finishes, materials};

use crate::{
    catalog::{self, Datum, Status},
    report::{listing::Listing, number::brief, table::Side},
};
use serde_json::{Value, json};

/// The whole catalogue, in the order of the chain.
pub fn listings() -> Vec<Listing> {
    vec![
        materials(catalog::materials()),
        finishes(catalog::finishes()),
        platings(catalog::platings()),
        threads(catalog::threads()),
        holes(catalog::clearance_holes()),
        heads(catalog::seats()),
        grades(catalog::grades()),
        friction(catalog::friction()),
        methods(catalog::methods()),
        gases(catalog::gases()),
        fillers(catalog::fillers()),
    ]
}

/// A heading of words.
fn words(heading: &'static str) -> (&'static str, Side) {
    (heading, Side::Left)
}

/// A heading of numbers.
fn numbers(heading: &'static str) -> (&'static str, Side) {
    (heading, Side::Right)
}

/// A value in a working unit; a star marks one given from memory.
fn shown(datum: &Datum, unit: f64) -> String {
    let mark = if datum.status == Status::Memory {
        "*"
    } else {
        ""
    };
    format!("{}{mark}", brief(datum.value / unit))
}

/// The same, or a dash.
fn shown_if(datum: Option<&Datum>, unit: f64) -> String {
    datum.map_or_else(|| "–".to_owned(), |datum| shown(datum, unit))
}

/// A value with everything known about it, SI.
fn datum(datum: &Datum) -> Value {
    json!({
        "value": datum.value,
        "range": datum.range,
        "status": status(datum.status),
        "source": datum.source,
    })
}

fn datum_if(value: Option<&Datum>) -> Value {
    value.map_or(Value::Null, datum)
}

fn status(status: Status) -> &'static str {
    match status {
        Status::Seen => "seen",
        Status::Memory => "memory",
        Status::Computed => "computed",
        Status::Judgement => "judgement",
        Status::User => "user",
    }
}

/// A bare value, with a star when its record is from memory.
fn starred(value: f64, of: Status) -> String {
    let mark = if of == Status::Memory { "*" } else { "" };
    format!("{}{mark}", brief(value))
}

/// A value, or a dash.
fn brief_if(value: Option<f64>) -> String {
    value.map_or_else(|| "–".to_owned(), brief)
}
