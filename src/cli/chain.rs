//! The one place where commands meet the chain: reading a joint, estimating it, drawing it.

use crate::{
    catalog::{self, Kind},
    cli::console::Trouble,
    diagnostic::{self, Colour, Fault},
    estimate::{Estimate, FieldMap, RingRow, TorqueSweep},
    figures::{self, Drawing, Format},
    joint::Joint,
    report::{
        catalogue,
        listing::{self, Listing},
    },
    units::{self, Quantity},
};

/// What `estimate` is asked for.
#[derive(Clone, Copy, Debug)]
pub struct Options {
    pub draws: u32,
    pub seed: u64,
}

/// What `torque` is asked for.
#[derive(Clone, Copy, Debug)]
pub struct SweepOptions {
    pub group: usize,
    pub from: Option<f64>,
    pub to: Option<f64>,
    pub steps: usize,
    pub draws: u32,
    pub seed: u64,
}

const NOT_BUILT: &str = "not built";

fn not_built<T>() -> Result<T, Trouble> {
    Err(Trouble::Failure(NOT_BUILT.to_owned()))
}

pub fn read(text: &str, _sets: &[String]) -> Result<Joint, (String, Vec<Fault>)> {
    Err((
        text.to_owned(),
        vec![Fault {
            code: "file/format",
            message: NOT_BUILT.to_owned(),
            span: 0..0,
            expected: String::new(),
            help: None,
        }],
    ))
}

/// A fault drawn into the text it is in. Colour is always there; the console strips it.
pub fn shown(fault: &Fault, path: &str, text: &str) -> String {
    let mut drawn = diagnostic::shown(fault, path, text, Colour::Ansi);
    drawn.push('\n');
    drawn
}

pub fn estimate(_joint: &Joint, _options: &Options) -> Result<Estimate, Trouble> {
    not_built()
}

pub fn torque_sweep(_joint: &Joint, _options: &SweepOptions) -> Result<TorqueSweep, Trouble> {
    not_built()
}

pub fn field_map(_joint: &Joint, _columns: usize) -> Result<FieldMap, Trouble> {
    not_built()
}

pub fn ring_tables(_joint: &Joint) -> Result<Vec<Vec<RingRow>>, Trouble> {
    not_built()
}

/// A torque from the command line, N m.
pub fn torque(text: &str) -> Result<f64, String> {
    units::parse(text, Quantity::Torque).map_err(|fault| match fault.help {
        Some(help) => format!("{}; {help}", fault.message),
        None => fault.message,
    })
}

pub fn schema() -> serde_json::Value {
    serde_json::Value::Null
}

/// The name that was probably meant.
pub fn nearest(name: &str, known: &[String]) -> Option<String> {
    diagnostic::nearest(name, known.iter().map(String::as_str))
}

/// The whole catalogue, in the order of the chain.
pub fn listings() -> Vec<Listing> {
    vec![
        catalogue::materials(catalog::materials()),
        catalogue::finishes(catalog::finishes()),
        catalogue::platings(catalog::platings()),
        catalogue::threads(catalog::threads()),
        catalogue::holes(catalog::clearance_holes()),
        catalogue::heads(catalog::seats()),
        catalogue::grades(catalog::grades()),
        catalogue::friction(catalog::friction()),
        catalogue::methods(catalog::methods()),
        catalogue::gases(catalog::gases()),
        catalogue::fillers(catalog::fillers()),
    ]
}

/// Everything known about one record, where its kind has records of one name each.
pub fn card((kind, name): (&str, &str)) -> Option<String> {
    let kind = match kind {
        "materials" => Kind::Materials,
        "finishes" => Kind::Finishes,
        "platings" => Kind::Platings,
        "threads" => Kind::Threads,
        "friction" => Kind::Friction,
        "methods" => Kind::Tightening,
        "gases" => Kind::Gases,
        "fillers" => Kind::Fillers,
        _ => return None,
    };
    let table = catalog::table(kind);
    let row = table.rows.iter().find(|row| row[0] == name)?;
    Some(listing::card(&table.columns, row))
}

/// A drawing as a file of the format.
pub fn render(drawing: &Drawing, format: Format) -> Result<Vec<u8>, Trouble> {
    figures::render(drawing, format).map_err(|fault| Trouble::Failure(fault.to_string()))
}
