//! Friction classes, pairs and nut factors: read from `friction.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::Shelf,
    raw::{CatalogFault, RawStatus, Sources, embedded, parse},
    records::FrictionRecord,
};

/// All friction classes, pairs and nut factors.
pub fn friction() -> &'static [FrictionRecord] {
    &shelf().records
}

/// A friction record by name or alias: `B`, `class B`, `dry steel`.
pub fn friction_record(name: &str) -> Option<&'static FrictionRecord> {
    shelf().find(name)
}

fn shelf() -> &'static Shelf<FrictionRecord> {
    static SHELF: OnceLock<Shelf<FrictionRecord>> = OnceLock::new();
    SHELF.get_or_init(|| embedded(read(include_str!("friction.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    friction: Vec<RawFriction>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawFriction {
    name: String,
    aliases: Vec<String>,
    kind: RawKind,
    values: [f64; 3],
    describes: String,
    status: RawStatus,
    source: String,
    of: Option<String>,
}

#[derive(Clone, Copy, PartialEq, Deserialize)]
enum RawKind {
    #[serde(rename = "coefficient")]
    Coefficient,
    #[serde(rename = "nut factor")]
    NutFactor,
}

pub(super) fn read(text: &str) -> Result<Shelf<FrictionRecord>, CatalogFault> {
    let file: File = parse("friction.toml", text)?;
    let records = file
        .friction
        .iter()
        .map(|raw| checked(raw, &file.sources))
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .friction
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Shelf::new(records, names)
}

fn checked(raw: &RawFriction, sources: &Sources) -> Result<FrictionRecord, CatalogFault> {
    let [low, nominal, high] = raw.values;
    if !(0.0 < low && low <= nominal && nominal <= high && high < 1.0) {
        return Err(CatalogFault::new(
            &raw.name,
            "0 < low ≤ nominal ≤ high < 1 must hold",
        ));
    }
    Ok(FrictionRecord {
        name: raw.name.clone(),
        values: raw.values,
        nut_factor: raw.kind == RawKind::NutFactor,
        describes: raw.describes.clone(),
        status: raw.status.into(),
        source: sources.name(&raw.source, raw.of.as_deref())?,
    })
}
