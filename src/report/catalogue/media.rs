//! Gases, fillers, platings.

use crate::{
    catalog::{FillerRecord, Gas, Plating},
    report::{
        catalogue::{datum, datum_if, numbers, shown, shown_if, status, words},
        listing::{Item, Listing},
        number::brief,
    },
};
use serde_json::json;

/// Temperature at which gases are compared, K.
const ROOM: f64 = 300.0;

/// Gases.
pub fn gases(records: &[Gas]) -> Listing {
    Listing {
        kind: "gases",
        headings: vec![
            words("name"),
            numbers("near\nK"),
            numbers("k\nW/(m·K)"),
            numbers("mean free path\nnm at 1 atm"),
            numbers("tables from\nK"),
            numbers("to\nK"),
        ],
        items: records.iter().map(gas).collect(),
    }
}

fn gas(record: &Gas) -> Item {
    let distance = |index: &usize| (record.temperatures[*index] - ROOM).abs();
    let nearest = (0..record.temperatures.len())
        .min_by(|one, other| distance(one).total_cmp(&distance(other)));
    let near = |table: &[f64], unit: f64| {
        let value = nearest.and_then(|index| table.get(index));
        brief(value.map_or(f64::NAN, |value| value / unit))
    };
    let end = |value: Option<&f64>| brief(value.copied().unwrap_or(f64::NAN));
    Item {
        cells: vec![
            record.name.clone(),
            near(&record.temperatures, 1.0),
            near(&record.conductivity, 1.0),
            near(&record.mean_free_path, 1e-9),
            end(record.temperatures.first()),
            end(record.temperatures.last()),
        ],
        keywords: String::new(),
        record: json!({
            "name": record.name,
            "temperatures": record.temperatures,
            "conductivity": record.conductivity,
            "mean_free_path": record.mean_free_path,
            "prandtl": record.prandtl,
            "heat_ratio": record.heat_ratio,
            "accommodation": datum(&record.accommodation),
            "status": status(record.status),
            "source": record.source,
        }),
    }
}

/// Fillers.
pub fn fillers(records: &[FillerRecord]) -> Listing {
    Listing {
        kind: "fillers",
        headings: vec![
            words("name"),
            words("model"),
            numbers("k\nW/(m·K)"),
            numbers("thickness\nµm"),
            numbers("modulus\nMPa"),
            words("mind"),
        ],
        items: records
            .iter()
            .map(|record| {
                let mut mind = Vec::new();
                if record.creeps {
                    mind.push("creeps");
                }
                if record.silicone {
                    mind.push("silicone");
                }
                if record.insulates {
                    mind.push("insulates");
                }
                Item {
                    cells: vec![
                        record.name.clone(),
                        record.model.clone(),
                        shown(&record.conductivity, 1.0),
                        shown_if(record.thickness.as_ref(), 1e-6),
                        shown_if(record.modulus.as_ref(), 1e6),
                        mind.join(", "),
                    ],
                    keywords: record.aliases.join("|"),
                    record: json!({
                        "name": record.name,
                        "aliases": record.aliases,
                        "model": record.model,
                        "conductivity": datum(&record.conductivity),
                        "yield_stress": datum_if(record.yield_stress.as_ref()),
                        "thickness": datum_if(record.thickness.as_ref()),
                        "thinnest": datum_if(record.thinnest.as_ref()),
                        "modulus": datum_if(record.modulus.as_ref()),
                        "hardness": datum_if(record.hardness.as_ref()),
                        "density": datum_if(record.density.as_ref()),
                        "points": record.points,
                        "creeps": record.creeps,
                        "silicone": record.silicone,
                        "insulates": record.insulates,
                        "status": status(record.status),
                        "source": record.source,
                        "note": record.note,
                    }),
                }
            })
            .collect(),
    }
}

/// Platings and films.
pub fn platings(records: &[Plating]) -> Listing {
    Listing {
        kind: "platings",
        headings: vec![
            words("name"),
            words("kind"),
            numbers("k\nW/(m·K)"),
            numbers("hardness\nMPa"),
            numbers("typical\nµm"),
        ],
        items: records
            .iter()
            .map(|record| Item {
                cells: vec![
                    record.name.clone(),
                    if record.metal { "metal" } else { "film" }.to_owned(),
                    shown(&record.conductivity, 1.0),
                    shown_if(record.hardness.as_ref(), 1e6),
                    shown(&record.typical_thickness, 1e-6),
                ],
                keywords: format!("{}|{}", record.aliases.join("|"), record.family),
                record: json!({
                    "name": record.name,
                    "aliases": record.aliases,
                    "metal": record.metal,
                    "conductivity": datum(&record.conductivity),
                    "hardness": datum_if(record.hardness.as_ref()),
                    "typical_thickness": datum(&record.typical_thickness),
                    "family": record.family,
                    "note": record.note,
                }),
            })
            .collect(),
    }
}
