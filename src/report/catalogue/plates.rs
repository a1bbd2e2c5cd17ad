//! Materials and finishes.

use crate::{
    catalog::{FinishRecord, FitForm, Material, MaterialKind},
    report::{
        catalogue::{datum, datum_if, numbers, shown, shown_if, words},
        listing::{Item, Listing},
        number::brief,
    },
};
use serde_json::{Value, json};

/// Plate materials.
pub fn materials(records: &[Material]) -> Listing {
    Listing {
        kind: "materials",
        headings: vec![
            words("name"),
            numbers("k\nW/(m·K)"),
            numbers("E\nGPa"),
            numbers("expansion\n1e-6/K"),
            numbers("hardness\nMPa"),
            numbers("yield\nMPa"),
            numbers("k known down to\nK"),
        ],
        items: records.iter().map(material).collect(),
    }
}

fn material(record: &Material) -> Item {
    let fit = record.conductivity_fit.as_ref();
    Item {
        cells: vec![
            record.name.clone(),
            shown(&record.conductivity, 1.0),
            shown(&record.youngs_modulus, 1e9),
            shown(&record.expansion, 1e-6),
            shown_if(record.hardness.as_ref(), 1e6),
            shown_if(record.yield_strength.as_ref(), 1e6),
            fit.map_or_else(|| "–".to_owned(), |fit| brief(fit.valid[0])),
        ],
        keywords: format!("{}|{}", record.aliases.join("|"), record.family),
        record: json!({
            "name": record.name,
            "aliases": record.aliases,
            "kind": match record.kind {
                MaterialKind::Metal => "metal",
                MaterialKind::Brittle => "brittle",
                MaterialKind::Polymer => "polymer",
                MaterialKind::Graphite => "graphite",
            },
            "family": record.family,
            "conductivity": datum(&record.conductivity),
            "conductivity_fit": fit.map_or(Value::Null, |fit| json!({
                "form": match fit.form {
                    FitForm::LogPolynomial => "log polynomial",
                    FitForm::CopperRational => "copper rational",
                },
                "coefficients": fit.coefficients,
                "valid": fit.valid,
                "source": fit.source,
            })),
            "youngs_modulus": datum(&record.youngs_modulus),
            "poisson": datum(&record.poisson),
            "expansion": datum(&record.expansion),
            "contraction": record.contraction,
            "density": datum_if(record.density.as_ref()),
            "hardness": datum_if(record.hardness.as_ref()),
            "microhardness": record.microhardness,
            "yield_strength": datum_if(record.yield_strength.as_ref()),
            "bearing_limit": datum_if(record.bearing_limit.as_ref()),
            "note": record.note,
        }),
    }
}

/// Surface finishes.
pub fn finishes(records: &[FinishRecord]) -> Listing {
    Listing {
        kind: "finishes",
        headings: vec![
            words("name"),
            numbers("Ra\nµm"),
            numbers("from\nµm"),
            numbers("to\nµm"),
            numbers("flatness\nµm per 100 mm"),
        ],
        items: records
            .iter()
            .map(|record| {
                let range = record.roughness_average.range;
                let end = |index: usize| {
                    range.map_or_else(|| "–".to_owned(), |ends| brief(ends[index] / 1e-6))
                };
                Item {
                    cells: vec![
                        record.name.clone(),
                        shown(&record.roughness_average, 1e-6),
                        end(0),
                        end(1),
                        shown(&record.flatness_per_100mm, 1e-6),
                    ],
                    keywords: record.aliases.join("|"),
                    record: json!({
                        "name": record.name,
                        "aliases": record.aliases,
                        "roughness_average": datum(&record.roughness_average),
                        "flatness_per_100mm": datum(&record.flatness_per_100mm),
                        "note": record.note,
                    }),
                }
            })
            .collect(),
    }
}
