//! Sandwich panels and the flanges of inserts: what the file says, and whether it can be.

use crate::{
    diagnostic::Fault,
    joint::{
        CooledPart, Cooling, Engagement, Flange, Sandwich, Sink,
        collector::{Collector, Wording, fault},
        materials::{self, Own},
        plates::PlateDraft,
        record::Record,
        tree::{Span, short},
        walk::missing,
    },
    units::{self, Quantity},
};

/// Stiffness of a core that states none, Pa (judgement: the lower end of aluminium honeycomb of 50 to
/// 80 kg/m³ through its thickness in the makers' tables, from memory).
const CORE_MODULUS: f64 = 5e8;
/// Material of inserts that state none.
const INSERT: &str = "Al 6061-T6";

/// Reads the sandwich of a plate; none when it states none or a faulty one.
pub(super) fn read(plate: &Record, own: &Own, collector: &mut Collector) -> Option<Sandwich> {
    let record = plate.record("sandwich")?;
    for (key, why) in [
        (
            "feet",
            "a sandwich panel has plain faces: put the feet on the other plate",
        ),
        ("ribs", "a sandwich panel has plain faces"),
        (
            "sag",
            "the curvature of a sandwich by its heat is not known here: state a `bow`",
        ),
    ] {
        if plate.has(key) {
            collector.report(
                refused(&plate.span(key), format!("a sandwich panel has `{key}`"))
                    .expecting(format!("expected a sandwich without `{key}`"))
                    .help(why),
            );
        }
    }
    let face_sheet = record.number("face_sheet");
    let thinnest = plate
        .stated_spread("thickness")
        .map(|bounds| bounds.low)
        .or(plate.number("thickness"));
    if let (Some(sheet), Some(whole)) = (face_sheet, thinnest) {
        collector.require(sheet < 0.5 * whole, || {
            refused(
                &record.span("face_sheet"),
                format!(
                    "two face sheets of {} leave no core in {}",
                    units::show(sheet, Quantity::Length),
                    units::show(whole, Quantity::Length)
                ),
            )
            .expecting("expected less than half the thickness of the plate")
            .help("`thickness` is that of the whole panel")
        });
    }
    let core_modulus = match record.number("core_modulus") {
        None if record.has("core_modulus") => None,
        None => {
            collector.assume(
                record.at("core_modulus"),
                units::show(CORE_MODULUS, Quantity::Pressure),
                "not stated; aluminium honeycomb of about 50 kg/m³ through its thickness",
            );
            Some(CORE_MODULUS)
        }
        stated => stated,
    };
    let insert = if record.has("insert") {
        materials::at(record, "insert", own, collector)
    } else {
        collector.assume(
            record.at("insert"),
            INSERT,
            "not stated; it fills the panel below the flange over the length of the insert, potting \
             included",
        );
        crate::catalog::material(INSERT).cloned()
    };
    collector.assume(
        record.at("core"),
        "half the conductivity in the plane, half the modulus in shear",
        "as of cells with walls of one thickness; the core hardly spreads heat beside its sheets",
    );
    Some(Sandwich {
        face_sheet: face_sheet?,
        core_conductivity: record.number("core_conductivity")?,
        core_modulus: core_modulus?,
        insert: insert?,
    })
}

/// Reads the flange of the inserts of a fastener: the outer option is none when it is faulty, the inner
/// one when there is none.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
pub(super) fn flange(
    fastener: &Record,
    (engagement, hole): (Engagement, f64),
    [near, far]: [&PlateDraft; 2],
    collector: &mut Collector,
) -> Option<Option<Flange>> {
    let before = collector.count();
    if near.record.has("sandwich") {
        collector.report(
            refused(
                &fastener.place,
                format!("a head would press on the sandwich `{}`", short(&near.name)),
            )
            .expecting("expected inserts in it, heads on the other outer plate")
            .help("state `from = \"name of the other outer plate\"` and `engagement = { kind = \"insert\", … }`"),
        );
    }
    let table = fastener.record("engagement");
    let is_insert = matches!(engagement, Engagement::Insert { .. });
    let panel = far.record.record("sandwich");
    if panel.is_some() && !is_insert {
        let place = table.map_or_else(|| fastener.place.clone(), |_| fastener.span("engagement"));
        collector.report(
            refused(
                &place,
                format!("bolts end in the sandwich `{}` without inserts", short(&far.name)),
            )
            .expecting("expected inserts")
            .help("state `engagement = { kind = \"insert\", length = \"12 mm\", flange = \"14 mm\" }`"),
        );
    }
    let found = table.and_then(|table| {
        if !is_insert {
            let key = ["flange", "proud"].into_iter().find(|key| table.has(key))?;
            collector.report(
                fault(
                    "fastener/flange",
                    &table.span(key),
                    format!("`{key}` belongs to inserts"),
                )
                .expecting("this engagement is no insert")
                .help(
                    "`engagement = { kind = \"insert\", length = \"12 mm\", flange = \"14 mm\" }`",
                ),
            );
            return None;
        }
        of_insert(table, (hole, panel), collector)
    });
    if let (Engagement::Insert { length }, Some(sheet)) = (
        engagement,
        panel.and_then(|panel| panel.number("face_sheet")),
    ) {
        collector.require(length > sheet, || {
            let place = table.map_or_else(|| fastener.place.clone(), |table| table.span("length"));
            refused(
                &place,
                format!(
                    "inserts of {} do not reach through a face sheet of {}",
                    units::show(length, Quantity::Length),
                    units::show(sheet, Quantity::Length)
                ),
            )
            .expecting("expected more than the face sheet")
        });
    }
    let whole = table.is_none_or(|table| !table.is_faulty("flange") && !table.is_faulty("proud"));
    (whole && collector.count() == before).then_some(found)
}

fn of_insert(
    table: &Record,
    (hole, panel): (f64, Option<&Record>),
    collector: &mut Collector,
) -> Option<Flange> {
    let Some(diameter) = table.number("flange") else {
        if !table.has("flange") && (panel.is_some() || table.has("proud")) {
            collector.report(missing(table, "flange", "flange = \"14 mm\"").help(
                "the flange of the insert carries the clamp force: state its outer diameter, \
                 `flange = \"14 mm\"`",
            ));
        }
        return None;
    };
    let radius = 0.5 * diameter;
    collector.require(radius > hole, || {
        fault(
            "fastener/flange",
            &table.span("flange"),
            format!(
                "a flange of {} lies within a hole of {}",
                units::show(diameter, Quantity::Length),
                units::show(2.0 * hole, Quantity::Length)
            ),
        )
        .expecting("expected an outer diameter larger than the hole")
    });
    if !table.has("proud") {
        collector.assume(
            table.at("proud"),
            "flush",
            "not stated; a flange that stands out keeps the faces apart beside it",
        );
    }
    Some(Flange {
        radius,
        proud: table.number("proud").unwrap_or(0.0),
    })
}

/// Refuses sinks at the edges of a sandwich, whose core is cut open there.
pub(super) fn cooled(plate: &PlateDraft, sink: Option<&Cooling>, collector: &mut Collector) {
    let by_edge = match sink {
        Some(Cooling::Whole(Sink::Rim)) => true,
        Some(Cooling::Parts(parts)) => parts
            .iter()
            .any(|part| matches!(part, CooledPart::Edge(_) | CooledPart::Rim)),
        _ => false,
    };
    collector.require(!(by_edge && plate.record.has("sandwich")), || {
        refused(&plate.record.span("cooled"), "a sandwich panel is cooled at its edges")
            .expecting("expected a film, a temperature or radiation on its back")
            .help("state a strip of the back along the edge: `cooled = { temperature = …, centre = …, size = … }`")
    });
}

/// Refuses a sandwich between other plates.
pub(super) fn between(plate: &Record, collector: &mut Collector) {
    collector.require(!plate.has("sandwich"), || {
        refused(
            &plate.span("sandwich"),
            "a sandwich panel lies between other plates",
        )
        .expecting("expected it first or last")
        .help("its inserts hold the bolts, and these end in an outer plate")
    });
}

fn refused(span: &Span, message: impl Into<String>) -> Fault {
    fault("plate/sandwich", span, message)
}
