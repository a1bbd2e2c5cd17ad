//! Tightening methods and their scatter: read from `methods.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::Shelf,
    raw::{CatalogFault, RawStatus, Sources, embedded, parse},
    records::MethodRecord,
};

/// All tightening methods.
pub fn methods() -> &'static [MethodRecord] {
    &shelf().records
}

/// A tightening method by name or alias.
pub fn method(name: &str) -> Option<&'static MethodRecord> {
    shelf().find(name)
}

fn shelf() -> &'static Shelf<MethodRecord> {
    static SHELF: OnceLock<Shelf<MethodRecord>> = OnceLock::new();
    SHELF.get_or_init(|| embedded(read(include_str!("methods.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    method: Vec<RawMethod>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawMethod {
    name: String,
    aliases: Vec<String>,
    family: String,
    scatter: [f64; 2],
    status: RawStatus,
    source: String,
    of: Option<String>,
}

pub(super) fn read(text: &str) -> Result<Shelf<MethodRecord>, CatalogFault> {
    let file: File = parse("methods.toml", text)?;
    let records = file
        .method
        .iter()
        .map(|raw| checked(raw, &file.sources))
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .method
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Shelf::new(records, names)
}

fn checked(raw: &RawMethod, sources: &Sources) -> Result<MethodRecord, CatalogFault> {
    let [least, most] = raw.scatter;
    if !(0.0 < least && least <= most && most < 1.0) {
        return Err(CatalogFault::new(
            &raw.name,
            "0 < least ≤ most < 1 must hold",
        ));
    }
    Ok(MethodRecord {
        name: raw.name.clone(),
        family: raw.family.clone(),
        scatter: raw.scatter,
        status: raw.status.into(),
        source: sources.name(&raw.source, raw.of.as_deref())?,
    })
}
