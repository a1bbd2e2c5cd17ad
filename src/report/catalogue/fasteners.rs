//! Threads, grades, heads, holes, friction, tightening methods.

use crate::{
    catalog::{self, ClearanceHole, FrictionRecord, Grade, MethodRecord, SeatRecord, Thread},
    report::{
        catalogue::{brief_if, datum, datum_if, numbers, shown, shown_if, starred, status, words},
        listing::{Item, Listing},
        number::{brief, wrapped},
    },
};
use serde_json::json;

/// Threads.
pub fn threads(records: &[Thread]) -> Listing {
    Listing {
        kind: "threads",
        headings: vec![
            words("name"),
            numbers("diameter\nmm"),
            numbers("pitch\nmm"),
            numbers("pitch diameter\nmm"),
            numbers("stress area\nmm²"),
        ],
        items: records.iter().map(thread).collect(),
    }
}

fn thread(record: &Thread) -> Item {
    let origin = catalog::thread_origin(&record.name);
    Item {
        cells: vec![
            record.name.clone(),
            brief(record.diameter * 1e3),
            brief(record.pitch * 1e3),
            brief(record.pitch_diameter * 1e3),
            brief(record.stress_area * 1e6),
        ],
        keywords: format!(
            "{}|{}",
            if record.inch {
                "inch unified"
            } else {
                "metric ISO"
            },
            origin.map_or("", |(series, _, _)| series)
        ),
        record: json!({
            "name": record.name,
            "series": origin.map(|(series, _, _)| series),
            "inch": record.inch,
            "diameter": record.diameter,
            "pitch": record.pitch,
            "pitch_diameter": record.pitch_diameter,
            "minor_diameter": record.minor_diameter,
            "nut_minor_diameter": record.nut_minor_diameter,
            "stress_diameter": record.stress_diameter,
            "stress_area": record.stress_area,
            "status": origin.map(|(_, of, _)| status(of)),
            "source": origin.map(|(_, _, source)| source),
        }),
    }
}

/// Strength grades.
pub fn grades(records: &[Grade]) -> Listing {
    Listing {
        kind: "grades",
        headings: vec![
            words("name"),
            words("standard"),
            words("diameter\nmm"),
            numbers("tensile\nMPa"),
            numbers("yield\nMPa"),
            numbers("proof\nMPa"),
            words("bolt material"),
        ],
        items: records
            .iter()
            .map(|record| Item {
                cells: vec![
                    record.name.clone(),
                    record.standard.clone(),
                    diameters(record, records),
                    shown(&record.tensile, 1e6),
                    shown_if(record.yield_strength.as_ref(), 1e6),
                    shown_if(record.proof.as_ref(), 1e6),
                    record.like.clone(),
                ],
                keywords: String::new(),
                record: json!({
                    "name": record.name,
                    "standard": record.standard,
                    "diameters": record.diameters,
                    "tensile": datum(&record.tensile),
                    "yield_strength": datum_if(record.yield_strength.as_ref()),
                    "proof": datum_if(record.proof.as_ref()),
                    "youngs_modulus": record.youngs_modulus,
                    "expansion": record.expansion,
                    "conductivity": datum(&record.conductivity),
                    "like": record.like,
                }),
            })
            .collect(),
    }
}

/// Diameters a grade is given for, mm; a row that goes on where another of its name ends does not hold that
/// end.
fn diameters(record: &Grade, all: &[Grade]) -> String {
    let Some([least, most]) = record.diameters else {
        return "–".to_owned();
    };
    let below = all
        .iter()
        .filter(|other| other.name == record.name)
        .filter_map(|other| other.diameters)
        .filter(|other| other[1] < least)
        .max_by(|one, other| one[1].total_cmp(&other[1]));
    let from = below.map_or_else(
        || brief(least * 1e3),
        |other| format!(">{}", brief(other[1] * 1e3)),
    );
    format!("{from}–{}", brief(most * 1e3))
}

/// Heads, nuts and washers as seats.
pub fn heads(records: &[SeatRecord]) -> Listing {
    Listing {
        kind: "heads",
        headings: vec![
            words("kind"),
            words("thread"),
            words("standard"),
            numbers("outer\nmm"),
            numbers("inner\nmm"),
            numbers("height\nmm"),
        ],
        items: records
            .iter()
            .map(|record| Item {
                cells: vec![
                    record.kind.clone(),
                    record.thread.clone(),
                    record.standard.clone(),
                    starred(record.outer * 1e3, record.status),
                    brief_if(record.inner.map(|inner| inner * 1e3)),
                    brief_if(record.height.map(|height| height * 1e3)),
                ],
                keywords: "seat".to_owned(),
                record: json!({
                    "kind": record.kind,
                    "standard": record.standard,
                    "thread": record.thread,
                    "outer": record.outer,
                    "inner": record.inner,
                    "height": record.height,
                    "status": status(record.status),
                    "source": record.source,
                }),
            })
            .collect(),
    }
}

/// Clearance holes.
pub fn holes(records: &[ClearanceHole]) -> Listing {
    Listing {
        kind: "holes",
        headings: vec![
            words("thread"),
            words("standard"),
            numbers("fine\nmm"),
            numbers("medium\nmm"),
            numbers("coarse\nmm"),
        ],
        items: records
            .iter()
            .map(|record| {
                let mut cells = vec![record.thread.clone(), record.standard.clone()];
                cells.extend(
                    record
                        .diameters
                        .map(|diameter| starred(diameter * 1e3, record.status)),
                );
                Item {
                    cells,
                    keywords: String::new(),
                    record: json!({
                        "thread": record.thread,
                        "standard": record.standard,
                        "fine": record.diameters[0],
                        "medium": record.diameters[1],
                        "coarse": record.diameters[2],
                        "status": status(record.status),
                        "source": record.source,
                    }),
                }
            })
            .collect(),
    }
}

/// Friction classes and nut factors.
pub fn friction(records: &[FrictionRecord]) -> Listing {
    Listing {
        kind: "friction",
        headings: vec![
            words("name"),
            words("of"),
            numbers("low"),
            numbers("nominal"),
            numbers("high"),
            words("stands for"),
        ],
        items: records
            .iter()
            .map(|record| {
                let quantity = if record.nut_factor { "K" } else { "µ" };
                let mut cells = vec![record.name.clone(), quantity.to_owned()];
                cells.extend(record.values.map(|value| starred(value, record.status)));
                cells.push(wrapped(&record.describes, 44, 0));
                Item {
                    cells,
                    keywords: if record.nut_factor {
                        "nut factor"
                    } else {
                        "coefficient"
                    }
                    .to_owned(),
                    record: json!({
                        "name": record.name,
                        "quantity": if record.nut_factor { "nut factor" } else { "coefficient" },
                        "low": record.values[0],
                        "nominal": record.values[1],
                        "high": record.values[2],
                        "describes": record.describes,
                        "status": status(record.status),
                        "source": record.source,
                    }),
                }
            })
            .collect(),
    }
}

/// Tightening methods.
pub fn methods(records: &[MethodRecord]) -> Listing {
    Listing {
        kind: "methods",
        headings: vec![
            words("name"),
            words("family"),
            numbers("least\n± %"),
            numbers("most\n± %"),
        ],
        items: records
            .iter()
            .map(|record| Item {
                cells: vec![
                    record.name.clone(),
                    record.family.clone(),
                    starred(record.scatter[0] * 100.0, record.status),
                    starred(record.scatter[1] * 100.0, record.status),
                ],
                keywords: "tightening".to_owned(),
                record: json!({
                    "name": record.name,
                    "family": record.family,
                    "scatter": record.scatter,
                    "status": status(record.status),
                    "source": record.source,
                }),
            })
            .collect(),
    }
}
