//! Platings and films: read from `platings.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::Shelf,
    raw::{CatalogFault, RawDatum, Sources, Values, embedded, parse},
    records::Plating,
};

/// All platings and films.
pub fn platings() -> &'static [Plating] {
    &shelf().records
}

/// A plating or film by name or alias.
pub fn plating(name: &str) -> Option<&'static Plating> {
    shelf().find(name)
}

fn shelf() -> &'static Shelf<Plating> {
    static SHELF: OnceLock<Shelf<Plating>> = OnceLock::new();
    SHELF.get_or_init(|| embedded(read(include_str!("platings.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    plating: Vec<RawPlating>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawPlating {
    name: String,
    aliases: Vec<String>,
    kind: RawKind,
    family: String,
    #[serde(rename = "conductivity_W_mK")]
    conductivity: RawDatum,
    #[serde(rename = "hardness_GPa")]
    hardness: Option<RawDatum>,
    #[serde(rename = "typical_thickness_um")]
    typical_thickness: RawDatum,
    note: Option<String>,
}

#[derive(Clone, Copy, PartialEq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum RawKind {
    Metal,
    Film,
}

pub(super) fn read(text: &str) -> Result<Shelf<Plating>, CatalogFault> {
    let file: File = parse("platings.toml", text)?;
    let records = file
        .plating
        .iter()
        .map(|raw| checked(raw, &file.sources))
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .plating
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Shelf::new(records, names)
}

fn checked(raw: &RawPlating, sources: &Sources) -> Result<Plating, CatalogFault> {
    let values = Values {
        record: &raw.name,
        sources,
    };
    let metal = raw.kind == RawKind::Metal;
    if metal && raw.hardness.is_none() {
        return Err(CatalogFault::new(
            &raw.name,
            "a metal plating needs a hardness",
        ));
    }
    Ok(Plating {
        name: raw.name.clone(),
        aliases: raw.aliases.clone(),
        metal,
        conductivity: values.datum(&raw.conductivity, 1.0)?,
        hardness: values.maybe(raw.hardness.as_ref(), 1e9)?,
        typical_thickness: values.datum(&raw.typical_thickness, 1e-6)?,
        family: raw.family.clone(),
        note: raw.note.clone(),
    })
}
