//! Sizes beyond which a file is more likely wrong than the joint: limits of this program.

use crate::{
    joint::{
        Fastener, Outline,
        collector::{Collector, Wording, fault},
        plates::PlateDraft,
        record::Record,
        tree::Span,
    },
    units::{self, Quantity},
};

/// Largest side of a plate in plan, m.
const LARGEST_PLAN: f64 = 3.0;
/// Largest thickness of a plate, and height of its feet and ribs, m.
const LARGEST_HEIGHT: f64 = 0.5;
/// Least thickness of a plate, m: what is thinner is a foil, and a foil is a layer between plates.
const LEAST_THICKNESS: f64 = 50e-6;
/// Thickness over the shortest side in plan up to which a body is a plate or a block.
const SLENDEREST: f64 = 10.0;
/// Outer diameter of a seat over the nominal diameter of its thread: wide washers have 5 to 8.
const WIDEST_SEAT: f64 = 10.0;

/// Plates of a size that this program does not take.
pub(super) fn plates(plates: &[PlateDraft], collector: &mut Collector) {
    for plate in plates {
        let name = &plate.name;
        let span = |key: &str| place(&plate.record, key);
        if let Some([thin, thick]) = plate.thickness_ends() {
            let is = if thin < thick { "may be" } else { "is" };
            let what = |thickness| format!("plate `{name}` {is} {} thick", length(thickness));
            let span = span("thickness");
            within((&what(thick), &span), (thick, LARGEST_HEIGHT), collector);
            // 50 µm as text is a last digit off 50 µm.
            let is_plate = thin >= LEAST_THICKNESS * (1.0 - 1e-9);
            collector.require(is_plate, || {
                fault("geometry/size-limit", &span, what(thin))
                    .expecting(format!(
                        "at least {}: a limit of this program",
                        length(LEAST_THICKNESS)
                    ))
                    .help("check the unit; a foil between two plates is a `filler`, a coat a `plating`")
            });
        }
        if let Some(outline) = &plate.outline {
            plan(plate, outline, collector);
        }
        let Some(parts) = &plate.parts else { continue };
        if let Some(feet) = &parts.feet {
            let what = format!("the feet of `{name}` are {} high", length(feet.height));
            within(
                (&what, &span("feet")),
                (feet.height, LARGEST_HEIGHT),
                collector,
            );
        }
        for (rib, span) in &parts.ribs {
            let what = format!("a rib of `{name}` is {} high", length(rib.height));
            within((&what, span), (rib.height, LARGEST_HEIGHT), collector);
        }
    }
}

fn plan(plate: &PlateDraft, outline: &Outline, collector: &mut Collector) {
    let key = ["size", "diameter", "outline"]
        .into_iter()
        .find(|key| plate.record.has(key))
        .unwrap_or("size");
    let span = place(&plate.record, key);
    let [low, high] = outline.corners();
    let sides = [0, 1].map(|axis| high[axis] - low[axis]);
    let [longest, shortest] = [sides[0].max(sides[1]), sides[0].min(sides[1])];
    let what = format!("plate `{}` is {} long", plate.name, length(longest));
    within((&what, &span), (longest, LARGEST_PLAN), collector);
    let Some([_, thickness]) = plate.thickness_ends() else {
        return;
    };
    let what = format!(
        "plate `{}` is {} thick on a plan {} wide",
        plate.name,
        length(thickness),
        length(shortest)
    );
    let most = SLENDEREST * shortest;
    // One fault for one thickness is enough.
    if thickness <= LARGEST_HEIGHT {
        let span = place(&plate.record, "thickness");
        within((&what, &span), (thickness, most), collector);
    }
}

/// Heads, nuts and washers far wider than their thread.
pub(super) fn seats(file: &Record, fasteners: &[Fastener], collector: &mut Collector) {
    for (record, fastener) in file.records("fastener").iter().zip(fasteners) {
        let most = WIDEST_SEAT * fastener.thread.diameter;
        let seats = [
            Some(("head", fastener.head_seat)),
            fastener.nut_seat.map(|seat| ("nut", seat)),
        ];
        let widest = seats
            .into_iter()
            .flatten()
            .max_by(|one, other| one.1.outer_radius.total_cmp(&other.1.outer_radius));
        let Some((part, seat)) = widest else { continue };
        let key = ["bearing", "washer", "nut_bearing", "head"]
            .into_iter()
            .find(|key| record.has(key))
            .unwrap_or("head");
        let across = 2.0 * seat.outer_radius;
        let what = format!(
            "the {part} of {} presses on {} across",
            fastener.thread.name,
            length(across)
        );
        within((&what, &place(record, key)), (across, most), collector);
    }
}

/// Where a key stands, or its table where it does not.
fn place(record: &Record, key: &str) -> Span {
    if record.has(key) {
        record.span(key)
    } else {
        record.place.clone()
    }
}

fn length(value: f64) -> String {
    units::show(value, Quantity::Length)
}

fn within((what, span): (&str, &Span), (value, most): (f64, f64), collector: &mut Collector) {
    collector.require(value <= most, || {
        fault("geometry/size-limit", span, what)
            .expecting(format!("at most {}: a limit of this program", length(most)))
            .help("check the unit; `ringsum explain geometry/size-limit` lists all limits")
    });
}
