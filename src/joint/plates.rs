//! The plates, their faces, where heat enters and leaves.

use std::sync::Arc;

use crate::{
    catalog::Material,
    joint::{
        Finish, FlatnessMap, MOST_PLATES, Outline, Plate, Sag, Sandwich, Underside,
        collector::{Collector, Wording, fault},
        finishes,
        maps::Tables,
        materials::{self, Own},
        patches::{self, Parts},
        record::Record,
        sag, sandwich,
        sections::plate_name,
        stacking,
        walk::missing,
    },
};

/// A plate as far as it could be read.
#[derive(Debug)]
pub(super) struct PlateDraft {
    /// Name.
    pub name: String,
    /// Its table.
    pub record: Record,
    /// Material.
    pub material: Option<Material>,
    /// Thickness, m.
    pub thickness: Option<f64>,
    /// Outline.
    pub outline: Option<Outline>,
    /// Where its own origin lies in the joint, m.
    pub origin: Option<[f64; 2]>,
    /// Faying face.
    pub finish: Option<Finish>,
    /// The face towards the cold side, where it is stated apart.
    pub finish_below: Option<Finish>,
    /// Known bow, m.
    pub bow: Option<f64>,
    /// Measured map of the faying face.
    pub flatness_map: Option<Arc<FlatnessMap>>,
    /// Thermal sag.
    pub sag: Option<Sag>,
    /// Core between two face sheets.
    pub sandwich: Option<Sandwich>,
    /// Cut-outs, feet and ribs.
    pub parts: Option<Parts>,
}

impl PlateDraft {
    /// Outline and origin.
    pub(super) fn placed(&self) -> Option<(&Outline, [f64; 2])> {
        Some((self.outline.as_ref()?, self.origin?))
    }

    /// Least and largest thickness, m.
    pub(super) fn thickness_ends(&self) -> Option<[f64; 2]> {
        let thickness = self.thickness?;
        let stated = self.record.stated_spread("thickness");
        Some(stated.map_or([thickness; 2], |bounds| [bounds.low, bounds.high]))
    }

    /// The finished plate.
    pub(super) fn finished(self) -> Option<Plate> {
        let lost = |key: &str, is_none: bool| is_none && self.record.has(key);
        if lost("flatness_map", self.flatness_map.is_none()) || lost("sag", self.sag.is_none()) {
            return None;
        }
        if lost("finish_below", self.finish_below.is_none())
            || lost("sandwich", self.sandwich.is_none())
        {
            return None;
        }
        let parts = self.parts?;
        let flatness = |key: &str| {
            let finish = self.record.record(key)?;
            finish.number("flatness")
        };
        Some(Plate {
            flatness: flatness("finish"),
            underside: self.finish_below.map(|finish| Underside {
                finish,
                flatness: flatness("finish_below"),
            }),
            name: self.name,
            material: self.material?,
            flexural_strength: self.record.number("flexural_strength"),
            thickness: self.thickness?,
            outline: self.outline?,
            origin: self.origin?,
            finish: self.finish?,
            bow: self.bow,
            flatness_map: self.flatness_map,
            sag: self.sag,
            cutouts: parts
                .cutouts
                .into_iter()
                .map(|(cutout, _)| cutout)
                .collect(),
            feet: parts.feet,
            ribs: parts.ribs.into_iter().map(|(rib, _)| rib).collect(),
            sandwich: self.sandwich,
        })
    }
}

/// Reads all plates, warm side first; none when there are less than two.
pub(super) fn read(
    file: &Record,
    own: &Own,
    tables: &mut Tables<'_>,
    collector: &mut Collector,
) -> Option<Vec<PlateDraft>> {
    let records = file.records("plate");
    if !file.has("plate") || file.is_faulty("plate") {
        return None;
    }
    if let Some(beyond) = records.get(MOST_PLATES) {
        collector.report(
            fault(
                "plate/count",
                &beyond.place,
                format!("the file has {} plates", records.len()),
            )
            .expecting(format!("expected at most {MOST_PLATES}"))
            .help("a thin shim of metal may stand as a [filler] of model \"layer\""),
        );
        return None;
    }
    if records.len() < 2 {
        let place = records
            .first()
            .map_or_else(|| file.span("plate"), |only| only.place.clone());
        collector.report(
            fault(
                "plate/count",
                &place,
                format!(
                    "a joint has two plates or more; the file has {}",
                    records.len()
                ),
            )
            .expecting("expected at least two [[plate]] tables")
            .help("the warm plate comes first"),
        );
        return None;
    }
    let count = records.len();
    let mut drafts: Vec<PlateDraft> = records
        .iter()
        .enumerate()
        .map(|(index, record)| {
            let name = plate_name((index, count)).unwrap_or("plate");
            draft(record, name, own, collector)
        })
        .collect();
    for draft in &mut drafts {
        draft.sag = sag::read(file, &draft.record, own, collector);
        draft.flatness_map = tables.flatness(&draft.record, draft.outline.as_ref(), collector);
    }
    stacking::check(records, &drafts, collector);
    stacking::place(&mut drafts, collector);
    Some(drafts)
}

fn draft(record: &Record, default_name: &str, own: &Own, collector: &mut Collector) -> PlateDraft {
    let bow = record.record("bow").and_then(|bow| {
        let height = bow.number("height")?;
        Some(if bow.text("kind")? == "convex" {
            -height
        } else {
            height
        })
    });
    for key in ["finish", "finish_below"] {
        if let Some(finish) = record.record(key)
            && !finish.has("flatness")
            && !record.has("bow")
            && !record.has("flatness_map")
        {
            collector.assume(
                finish.at("flatness"),
                "flat",
                "not stated; out-of-flatness opens the joint between the bolts",
            );
        }
    }
    if record.has("bow") && record.has("flatness_map") {
        collector.report(two_ways(record, ["bow", "flatness_map"]));
    }
    let outline = outline(record, collector);
    PlateDraft {
        name: record.text("name").unwrap_or(default_name).to_owned(),
        material: materials::of_plate(record, own, collector),
        thickness: record.number("thickness"),
        sandwich: sandwich::read(record, own, collector),
        parts: patches::read(record, outline.as_ref(), collector),
        outline,
        origin: None,
        finish: finishes::read(record, "finish", collector),
        finish_below: finishes::read(record, "finish_below", collector),
        bow,
        flatness_map: None,
        sag: None,
        record: record.clone(),
    }
}

fn outline(record: &Record, collector: &mut Collector) -> Option<Outline> {
    let stated: Vec<&str> = ["size", "diameter", "outline"]
        .into_iter()
        .filter(|key| record.has(key))
        .collect();
    match stated.as_slice() {
        ["size"] => Some(Outline::Rectangle {
            size: record.point("size")?,
        }),
        ["diameter"] => Some(Outline::Disc {
            radius: record.number("diameter")? / 2.0,
        }),
        ["outline"] => Some(Outline::Polygon {
            points: patches::outline(record, collector)?,
        }),
        [first, second, ..] => {
            collector.report(two_ways(record, [first, second]));
            None
        }
        _ => {
            collector.report(
                missing(record, "size", "size = [\"80 mm\", \"80 mm\"]").help(
                    "for example `size = [\"80 mm\", \"80 mm\"]`, or `diameter = \"60 mm\"`, or \
                     an `outline` by points",
                ),
            );
            None
        }
    }
}

/// Two keys that say the same thing.
pub(super) fn two_ways(record: &Record, keys: [&str; 2]) -> crate::diagnostic::Fault {
    fault(
        "file/conflict",
        &record.span(keys[1]),
        format!("`{}` and `{}` are both stated", keys[0], keys[1]),
    )
    .expecting("expected one of the two")
}
