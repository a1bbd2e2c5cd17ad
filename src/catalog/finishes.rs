//! Finishes by process: read from `finishes.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::Shelf,
    raw::{CatalogFault, RawDatum, Sources, Values, embedded, parse},
    records::FinishRecord,
};

/// All finishes.
pub fn finishes() -> &'static [FinishRecord] {
    &shelf().records
}

/// A finish by name or alias.
pub fn finish(name: &str) -> Option<&'static FinishRecord> {
    shelf().find(name)
}

fn shelf() -> &'static Shelf<FinishRecord> {
    static SHELF: OnceLock<Shelf<FinishRecord>> = OnceLock::new();
    SHELF.get_or_init(|| embedded(read(include_str!("finishes.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    finish: Vec<RawFinish>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawFinish {
    name: String,
    aliases: Vec<String>,
    #[serde(rename = "roughness_average_um")]
    roughness_average: RawDatum,
    #[serde(rename = "flatness_um_per_100mm")]
    flatness: RawDatum,
    note: Option<String>,
}

pub(super) fn read(text: &str) -> Result<Shelf<FinishRecord>, CatalogFault> {
    let file: File = parse("finishes.toml", text)?;
    let records = file
        .finish
        .iter()
        .map(|raw| {
            let values = Values {
                record: &raw.name,
                sources: &file.sources,
            };
            Ok(FinishRecord {
                name: raw.name.clone(),
                aliases: raw.aliases.clone(),
                roughness_average: values.datum(&raw.roughness_average, 1e-6)?,
                flatness_per_100mm: values.datum(&raw.flatness, 1e-6)?,
                note: raw.note.clone(),
            })
        })
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .finish
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Shelf::new(records, names)
}
