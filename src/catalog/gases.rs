//! Gases in the gap: read from `gases.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::Shelf,
    raw::{CatalogFault, RawDatum, RawOrigin, RawStatus, Sources, Values, embedded, parse},
    records::Gas,
};

/// All gases.
pub fn gases() -> &'static [Gas] {
    &shelf().records
}

/// A gas by name or formula.
pub fn gas(name: &str) -> Option<&'static Gas> {
    shelf().find(name)
}

fn shelf() -> &'static Shelf<Gas> {
    static SHELF: OnceLock<Shelf<Gas>> = OnceLock::new();
    SHELF.get_or_init(|| embedded(read(include_str!("gases.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    gas: Vec<RawGas>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawGas {
    name: String,
    aliases: Vec<String>,
    #[serde(rename = "temperatures_K")]
    temperatures: Vec<f64>,
    #[serde(rename = "conductivity_W_mK")]
    conductivity: Vec<f64>,
    #[serde(rename = "mean_free_path_nm")]
    mean_free_path: Vec<f64>,
    prandtl: Vec<f64>,
    heat_ratio: Vec<f64>,
    status: RawStatus,
    source: String,
    accommodation: RawDatum,
}

pub(super) fn read(text: &str) -> Result<Shelf<Gas>, CatalogFault> {
    let file: File = parse("gases.toml", text)?;
    let records = file
        .gas
        .iter()
        .map(|raw| checked(raw, &file.sources))
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .gas
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Shelf::new(records, names)
}

fn checked(raw: &RawGas, sources: &Sources) -> Result<Gas, CatalogFault> {
    let values = Values {
        record: &raw.name,
        sources,
    };
    let columns = [
        &raw.conductivity,
        &raw.mean_free_path,
        &raw.prandtl,
        &raw.heat_ratio,
    ];
    let rising = raw.temperatures.windows(2).all(|pair| pair[0] < pair[1]);
    let even = columns
        .iter()
        .all(|column| column.len() == raw.temperatures.len());
    if !(rising && even) {
        let what = "temperatures must rise and every column have as many rows";
        return Err(CatalogFault::new(&raw.name, what));
    }
    let origin = sources.origin(&RawOrigin {
        status: raw.status,
        source: raw.source.clone(),
        of: None,
    })?;
    Ok(Gas {
        name: raw.name.clone(),
        temperatures: values.positive(&raw.temperatures, 1.0)?,
        conductivity: values.positive(&raw.conductivity, 1.0)?,
        mean_free_path: values.positive(&raw.mean_free_path, 1e-9)?,
        prandtl: values.positive(&raw.prandtl, 1.0)?,
        heat_ratio: values.positive(&raw.heat_ratio, 1.0)?,
        accommodation: values.datum(&raw.accommodation, 1.0)?,
        status: origin.status,
        source: origin.source,
    })
}
