//! The plates, their faces, where heat enters and leaves.

use std::sync::Arc;

use crate::{
    catalog::Material,
    joint::{
        Finish, FlatnessMap, MOST_PLATES, Outline, Patch, Plate, Sag, Sink, Source, Underside,
        Zone,
        collector::{Collector, Wording, fault},
        finishes,
        geometry::{holds_zone, swallowed},
        maps::Tables,
        materials::{self, Own},
        patches::{self, Parts},
        record::Record,
        sag,
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
        if lost("finish_below", self.finish_below.is_none()) {
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

/// Reads where heat enters the first plate.
pub(super) fn source(upper: &PlateDraft, collector: &mut Collector) -> Option<Source> {
    let record = match upper.record.record("heated") {
        Some(record) => record,
        None if upper.record.has("heated") => return None,
        None => {
            collector.assume(
                upper.record.at("heated"),
                "uniform flux on the whole outer face",
                "not stated",
            );
            return Some(Source {
                zone: Zone::Face,
                isothermal: false,
            });
        }
    };
    let zone = zone(record, upper, collector)?;
    let outline = upper.outline.as_ref()?;
    collector.require(holds_zone(outline, zone) && !falls_out(upper, zone), || {
        fault(
            "zone/outside",
            &record.place,
            if holds_zone(outline, zone) {
                format!(
                    "the heated zone lies in a cut-out of plate `{}`",
                    upper.name
                )
            } else {
                format!("the heated zone reaches beyond plate `{}`", upper.name)
            },
        )
        .expecting("expected inside the plate")
        .help(
            "`centre` is measured from the lower left corner of the plate (round: from its centre; outline: as its points)",
        )
    });
    Some(Source {
        zone,
        isothermal: record.text("face") == Some("isothermal"),
    })
}

/// Whether a zone lies wholly in the cut-outs of its plate.
fn falls_out(upper: &PlateDraft, zone: Zone) -> bool {
    let shape = match zone {
        Zone::Face => return false,
        Zone::Rectangle { centre, size } => Patch::Rectangle { centre, size },
        Zone::Disc { centre, radius } => Patch::Disc { centre, radius },
    };
    let cutouts = upper.parts.iter().flat_map(|parts| &parts.cutouts);
    let cutouts: Vec<Patch> = cutouts.map(|(cutout, _)| cutout.clone()).collect();
    !cutouts.is_empty() && swallowed(&shape, &cutouts)
}

fn zone(record: &Record, upper: &PlateDraft, collector: &mut Collector) -> Option<Zone> {
    let centre = || match record.point("centre") {
        Some(centre) => Some(centre),
        None if record.has("centre") => None,
        None => Some(upper.outline.as_ref()?.centre()),
    };
    match (record.has("size"), record.has("diameter")) {
        (true, true) => {
            collector.report(two_ways(record, ["size", "diameter"]));
            None
        }
        (true, false) => Some(Zone::Rectangle {
            size: record.point("size")?,
            centre: centre()?,
        }),
        (false, true) => Some(Zone::Disc {
            radius: record.number("diameter")? / 2.0,
            centre: centre()?,
        }),
        (false, false) if record.has("centre") => {
            collector.report(missing(record, "size", "size = [\"60 mm\", \"60 mm\"]"));
            None
        }
        (false, false) => Some(Zone::Face),
    }
}

/// Reads where heat leaves the second plate.
pub(super) fn sink(lower: &PlateDraft, collector: &mut Collector) -> Option<Sink> {
    let record = match lower.record.record("cooled") {
        Some(record) => record,
        None if lower.record.has("cooled") => return None,
        None => {
            collector.assume(
                lower.record.at("cooled"),
                "the whole back at one temperature",
                "not stated; a film or an edge changes what the joint adds",
            );
            return Some(Sink::IsothermalBack);
        }
    };
    let stated: Vec<&str> = ["film", "temperature", "face", "edge"]
        .into_iter()
        .filter(|key| record.has(key))
        .collect();
    match stated.as_slice() {
        ["film"] => record.number("film").map(Sink::Film),
        ["temperature" | "face"] | ["temperature", "face"] => Some(Sink::IsothermalBack),
        ["edge"] | ["temperature", "edge"] => {
            let round = matches!(lower.outline.as_ref()?, Outline::Disc { .. });
            collector.require(round, || {
                fault(
                    "plate/not-round",
                    &record.span("edge"),
                    format!("plate `{}` has no rim: it is not round", lower.name),
                )
                .expecting("expected a plate with a `diameter`")
                .help("cool the back: `cooled = { film = \"500 W/(m²·K)\" }`")
            });
            Some(Sink::Rim)
        }
        [] => {
            collector.report(missing(record, "film", "film = \"500 W/(m²·K)\""));
            None
        }
        [first, .., last] => {
            collector.report(two_ways(record, [first, last]));
            None
        }
        [_] => None,
    }
}
