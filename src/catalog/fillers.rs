//! Fillers of generic kind: read from `fillers.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::Shelf,
    raw::{CatalogFault, RawDatum, RawStatus, Sources, Values, embedded, parse},
    records::FillerRecord,
};

/// 1 cm² K/W in m² K/W.
const CM2: f64 = 1e-4;

/// All fillers.
pub fn fillers() -> &'static [FillerRecord] {
    &shelf().records
}

/// A filler by name or alias.
pub fn filler(name: &str) -> Option<&'static FillerRecord> {
    shelf().find(name)
}

fn shelf() -> &'static Shelf<FillerRecord> {
    static SHELF: OnceLock<Shelf<FillerRecord>> = OnceLock::new();
    SHELF.get_or_init(|| embedded(read(include_str!("fillers.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    filler: Vec<RawFiller>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawFiller {
    name: String,
    aliases: Vec<String>,
    model: RawModel,
    #[serde(rename = "conductivity_W_mK")]
    conductivity: RawDatum,
    #[serde(rename = "yield_stress_Pa")]
    yield_stress: Option<RawDatum>,
    #[serde(rename = "thickness_um")]
    thickness: Option<RawDatum>,
    #[serde(rename = "thinnest_um")]
    thinnest: Option<RawDatum>,
    #[serde(rename = "modulus_MPa")]
    modulus: Option<RawDatum>,
    #[serde(rename = "density_kg_m3")]
    density: Option<RawDatum>,
    #[serde(rename = "hardness_MPa")]
    hardness: Option<RawDatum>,
    #[serde(rename = "at_zero_cm2K_W")]
    at_zero: Option<RawDatum>,
    #[serde(rename = "points_kPa_cm2K_W", default)]
    points: Vec<[f64; 2]>,
    creeps: bool,
    silicone: bool,
    insulates: bool,
    status: RawStatus,
    source: String,
    of: Option<String>,
    note: Option<String>,
}

#[derive(Clone, Copy, PartialEq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum RawModel {
    Fluid,
    Paste,
    Layer,
}

pub(super) fn read(text: &str) -> Result<Shelf<FillerRecord>, CatalogFault> {
    let file: File = parse("fillers.toml", text)?;
    let records = file
        .filler
        .iter()
        .map(|raw| checked(raw, &file.sources))
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .filler
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Shelf::new(records, names)
}

fn checked(raw: &RawFiller, sources: &Sources) -> Result<FillerRecord, CatalogFault> {
    let values = Values {
        record: &raw.name,
        sources,
    };
    let mut points = Vec::new();
    if let Some(zero) = values.maybe(raw.at_zero.as_ref(), CM2)? {
        points.push((0.0, zero.value));
    }
    points.extend(values.points(&raw.points, [1e3, CM2])?);
    let falls = points
        .windows(2)
        .all(|pair| pair[0].0 < pair[1].0 && pair[0].1 > pair[1].1);
    if !falls {
        let what = "area resistance must fall as the pressure rises";
        return Err(CatalogFault::new(&raw.name, what));
    }
    let paste = raw.yield_stress.is_some() && raw.thinnest.is_some() && raw.thickness.is_some();
    if raw.model == RawModel::Paste && !paste {
        let what = "a paste needs yield stress, thinnest and applied thickness";
        return Err(CatalogFault::new(&raw.name, what));
    }
    if raw.modulus.is_some() && (raw.model != RawModel::Layer || raw.thickness.is_none()) {
        let what = "a modulus belongs to a layer of known thickness";
        return Err(CatalogFault::new(&raw.name, what));
    }
    Ok(FillerRecord {
        name: raw.name.clone(),
        aliases: raw.aliases.clone(),
        model: match raw.model {
            RawModel::Fluid => "fluid",
            RawModel::Paste => "paste",
            RawModel::Layer => "layer",
        }
        .to_owned(),
        conductivity: values.datum(&raw.conductivity, 1.0)?,
        yield_stress: values.maybe(raw.yield_stress.as_ref(), 1.0)?,
        thickness: values.maybe(raw.thickness.as_ref(), 1e-6)?,
        thinnest: values.maybe(raw.thinnest.as_ref(), 1e-6)?,
        modulus: values.maybe(raw.modulus.as_ref(), 1e6)?,
        density: values.maybe(raw.density.as_ref(), 1.0)?,
        hardness: values.maybe(raw.hardness.as_ref(), 1e6)?,
        points,
        creeps: raw.creeps,
        silicone: raw.silicone,
        insulates: raw.insulates,
        status: raw.status.into(),
        source: sources.name(&raw.source, raw.of.as_deref())?,
        note: raw.note.clone(),
    })
}
