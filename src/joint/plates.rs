//! The two plates, where they lie on each other, where heat enters and leaves.

use std::sync::Arc;

use crate::{
    catalog::Material,
    joint::{
        Finish, FlatnessMap, Outline, Plate, Sag,
        collector::{Collector, Wording, fault},
        finishes,
        geometry::overlap,
        maps::Tables,
        materials::{self, Own, duplicate},
        patches::{self, Parts},
        record::Record,
        sag,
        sections::PLATE_NAMES,
        walk::missing,
    },
};

/// Plates this version reads.
const COUNT: usize = 2;

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
    /// Known bow, m.
    pub bow: Option<f64>,
    /// Measured map of the faying face.
    pub flatness_map: Option<Arc<FlatnessMap>>,
    /// Thermal sag.
    pub sag: Option<Sag>,
    /// Cut-outs, feet and ribs.
    pub parts: Option<Parts>,
}

impl PlateDraft {
    /// Outline and origin.
    pub(super) fn placed(&self) -> Option<(&Outline, [f64; 2])> {
        Some((self.outline.as_ref()?, self.origin?))
    }

    /// The finished plate.
    pub(super) fn finished(self) -> Option<Plate> {
        let lost = |key: &str, is_none: bool| is_none && self.record.has(key);
        if lost("flatness_map", self.flatness_map.is_none()) || lost("sag", self.sag.is_none()) {
            return None;
        }
        let parts = self.parts?;
        Some(Plate {
            flatness: self
                .record
                .record("finish")
                .and_then(|finish| finish.number("flatness")),
            name: self.name,
            material: self.material?,
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
        })
    }
}

/// Reads both plates; none when there are not two.
pub(super) fn read(
    file: &Record,
    own: &Own,
    tables: &mut Tables<'_>,
    collector: &mut Collector,
) -> Option<[PlateDraft; COUNT]> {
    let records = file.records("plate");
    if !file.has("plate") || file.is_faulty("plate") {
        return None;
    }
    if let Some(third) = records.get(COUNT) {
        collector.report(
            fault(
                "plate/count",
                &third.place,
                format!("the file has {} plates", records.len()),
            )
            .expecting("this version reads two plates")
            .help("join two plates at a time; a shim of metal is a [filler] of model \"layer\""),
        );
    }
    let [first, second, ..] = records else {
        let place = records
            .first()
            .map_or_else(|| file.span("plate"), |only| only.place.clone());
        collector.report(
            fault(
                "plate/count",
                &place,
                format!("a joint has two plates; the file has {}", records.len()),
            )
            .expecting("expected two [[plate]] tables")
            .help("the warm plate comes first"),
        );
        return None;
    };
    let mut upper = draft(first, PLATE_NAMES[0], own, collector);
    let mut lower = draft(second, PLATE_NAMES[1], own, collector);
    for draft in [&mut upper, &mut lower] {
        draft.sag = sag::read(file, &draft.record, own, collector);
        draft.flatness_map = tables.flatness(&draft.record, draft.outline.as_ref(), collector);
    }
    if first.has("feet") && second.has("feet") {
        collector.report(
            fault("plate/feet", &second.span("feet"), "both plates have feet")
                .expecting("expected feet on one of the two")
                .help(
                    "feet stand on the plain face of the other plate: state them on one side only",
                ),
        );
    }
    if upper.name == lower.name {
        collector.report(duplicate("plate", &lower.name, &second.span("name")));
    }
    misplaced(first, &["offset", "cooled"], "second", collector);
    misplaced(second, &["heated"], "first", collector);
    upper.origin = Some([0.0, 0.0]);
    lower.origin = origin_of_second(&upper, &lower, collector);
    if let (Some(above), Some(below)) = (upper.placed(), lower.placed())
        && !overlap(above, below)
    {
        collector.report(
            fault(
                "plate/no-overlap",
                &second.span("offset"),
                "the plates do not lie on each other",
            )
            .expecting("expected a place on this plate")
            .help("`offset` is where the corner (round: the centre; outline: the origin of its points) of the first plate lies on the second"),
        );
        // Without a place for it, no hole is told to lie beside this plate.
        lower.origin = None;
    }
    Some([upper, lower])
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
    if let Some(finish) = record.record("finish")
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
    if record.has("bow") && record.has("flatness_map") {
        collector.report(two_ways(record, ["bow", "flatness_map"]));
    }
    let outline = outline(record, collector);
    PlateDraft {
        name: record.text("name").unwrap_or(default_name).to_owned(),
        material: materials::of_plate(record, own, collector),
        thickness: record.number("thickness"),
        parts: patches::read(record, outline.as_ref(), collector),
        outline,
        origin: None,
        finish: finishes::read(record, collector),
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

fn misplaced(record: &Record, keys: &[&str], owner: &str, collector: &mut Collector) {
    for key in keys.iter().filter(|key| record.has(key)) {
        collector.report(
            fault(
                "plate/misplaced",
                &record.span(key),
                format!("`{key}` belongs to the {owner} plate"),
            )
            .expecting(format!("expected in the {owner} [[plate]]"))
            .help("the warm plate comes first: it is heated, and it lies on the second, which is cooled"),
        );
    }
}

fn origin_of_second(
    upper: &PlateDraft,
    lower: &PlateDraft,
    collector: &mut Collector,
) -> Option<[f64; 2]> {
    if let Some(offset) = lower.record.point("offset") {
        return Some([0.0 - offset[0], 0.0 - offset[1]]);
    }
    if lower.record.has("offset") {
        return None;
    }
    let (above, below) = (upper.outline.as_ref()?, lower.outline.as_ref()?);
    if above != below {
        collector.assume(
            lower.record.at("offset"),
            "centred",
            "the plates differ in outline and no offset is stated",
        );
    }
    let (centre, own) = (above.centre(), below.centre());
    Some([centre[0] - own[0], centre[1] - own[1]])
}
