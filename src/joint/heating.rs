//! Where heat enters the first plate: one zone, or several with heat of their own.

use crate::{
    joint::{
        HeatedZone, Heating, Patch, Source, Zone,
        collector::{Collector, Wording, fault},
        geometry::{holds_zone, swallowed},
        plates::{PlateDraft, two_ways},
        record::Record,
        walk::missing,
    },
    units::{self, Quantity},
};

/// Sums that differ by less are the same as written.
const ROUNDING: f64 = 1e-6;

/// Whether the file states the heat, in the service or zone by zone.
pub(super) fn states_heat(file: &Record) -> bool {
    let service = file.record("service");
    service.is_some_and(|service| service.has("heat"))
        || zones(file).iter().any(|zone| zone.has("heat"))
}

/// Zones of the first plate as the file states them.
fn zones(file: &Record) -> &[Record] {
    let first = file.records("plate").first();
    first.map_or(&[], |plate| plate.records("heated"))
}

/// The heat of the joint, W: of the service, or the sum of the heated zones; both must agree.
pub(super) fn heat(file: &Record, collector: &mut Collector) -> Option<f64> {
    let service = file.record("service")?;
    let stated = service.number("heat");
    let zones = zones(file);
    if !zones.iter().any(|zone| zone.has("heat")) {
        return stated;
    }
    // A zone without heat among several is told where the zones are read.
    let each: Option<Vec<f64>> = zones.iter().map(|zone| zone.number("heat")).collect();
    let Some(each) = each else { return stated };
    let sum: f64 = each.iter().sum();
    let Some(stated) = stated else {
        if !service.has("heat") {
            collector.assume(
                service.at("heat"),
                units::show(sum, Quantity::Power),
                "the heat of the heated zones",
            );
        }
        return Some(sum);
    };
    collector.require((sum / stated - 1.0).abs() <= ROUNDING, || {
        fault(
            "zone/heat-sum",
            &service.span("heat"),
            format!(
                "the heated zones take {} together, the service states {}",
                units::show(sum, Quantity::Power),
                units::show(stated, Quantity::Power)
            ),
        )
        .expecting("expected the sum of the zones")
        .help("leave it out: the heat of the joint is then the sum of its zones")
    });
    Some(stated)
}

/// Reads where heat enters the first plate.
pub(super) fn read(upper: &PlateDraft, collector: &mut Collector) -> Option<Heating> {
    let records = upper.record.records("heated");
    match records {
        [] if upper.record.has("heated") => None,
        [] => {
            collector.assume(
                upper.record.at("heated"),
                "uniform flux on the whole outer face",
                "not stated",
            );
            Some(Heating::One(Source {
                zone: Zone::Face,
                isothermal: false,
            }))
        }
        [only] => Some(Heating::One(Source {
            zone: inside(only, ("heated", upper), collector)?,
            isothermal: only.text("face") == Some("isothermal"),
        })),
        several => {
            let zones: Vec<HeatedZone> = several
                .iter()
                .filter_map(|record| one_of_several(record, upper, collector))
                .collect();
            (zones.len() == several.len()).then_some(Heating::Several(zones))
        }
    }
}

fn one_of_several(
    record: &Record,
    upper: &PlateDraft,
    collector: &mut Collector,
) -> Option<HeatedZone> {
    if !record.has("heat") {
        collector.report(
            missing(record, "heat", "heat = \"12 W\"")
                .help("one of several zones states its own heat, for example `heat = \"12 W\"`"),
        );
    }
    let even = record.text("face") != Some("isothermal");
    collector.require(even, || {
        fault(
            "file/conflict",
            &record.span("face"),
            "one of several heated zones shall have one temperature",
        )
        .expecting("expected uniform flux, or one zone alone")
        .help("the heat of each zone is stated, so that its temperature follows: leave `face` out")
    });
    let zone = inside(record, ("heated", upper), collector)?;
    let heat = record.number("heat")?;
    even.then_some(HeatedZone { zone, heat })
}

/// A zone of an outer face in its plate's own coordinates, which must lie on the plate.
pub(super) fn inside(
    record: &Record,
    (what, plate): (&str, &PlateDraft),
    collector: &mut Collector,
) -> Option<Zone> {
    let zone = zone(record, plate, collector)?;
    let outline = plate.outline.as_ref()?;
    collector.require(holds_zone(outline, zone) && !falls_out(plate, zone), || {
        fault(
            "zone/outside",
            &record.place,
            if holds_zone(outline, zone) {
                format!("the {what} zone lies in a cut-out of plate `{}`", plate.name)
            } else {
                format!("the {what} zone reaches beyond plate `{}`", plate.name)
            },
        )
        .expecting("expected inside the plate")
        .help(
            "`centre` is measured from the lower left corner of the plate (round: from its centre; outline: as its points)",
        )
    });
    Some(zone)
}

/// Whether a zone lies wholly in the cut-outs of its plate.
fn falls_out(plate: &PlateDraft, zone: Zone) -> bool {
    let shape = match zone {
        Zone::Face => return false,
        Zone::Rectangle { centre, size } => Patch::Rectangle { centre, size },
        Zone::Disc { centre, radius } => Patch::Disc { centre, radius },
    };
    let cutouts = plate.parts.iter().flat_map(|parts| &parts.cutouts);
    let cutouts: Vec<Patch> = cutouts.map(|(cutout, _)| cutout.clone()).collect();
    !cutouts.is_empty() && swallowed(&shape, &cutouts)
}

fn zone(record: &Record, plate: &PlateDraft, collector: &mut Collector) -> Option<Zone> {
    let centre = || match record.point("centre") {
        Some(centre) => Some(centre),
        None if record.has("centre") => None,
        None => Some(plate.outline.as_ref()?.centre()),
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
