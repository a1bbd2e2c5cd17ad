//! Outlines by points, and the parts of a plate: cut-outs, feet, ribs.

use std::sync::Arc;

use crate::{
    diagnostic::Fault,
    joint::{
        Feet, Outline, Patch, Rib,
        collector::{Collector, Wording, fault},
        geometry::{distinct_heights, holds_patch, swallowed},
        plates::two_ways,
        record::{Point, Record},
        tree::Span,
        walk::{missing, more_than},
    },
    numerics::polygon,
    units::{self, Quantity},
};

/// Most points of an outline.
pub(super) const MOST_POINTS: usize = 500;

/// Most cut-outs, feet or ribs of a plate.
pub(super) const MOST_PATCHES: usize = 100;

/// Most distinct heights of the ribs of a plate: each is a plate of its own thickness to the
/// solvers.
const MOST_HEIGHTS: usize = 4;

/// Points nearer than this are one, and edges nearer than this meet, m.
const SAME_PLACE: f64 = 1e-9;

/// An area below this share of the square of the extent is none.
const NO_AREA: f64 = 1e-9;

/// What stands on a plate or is cut out of it, each with the place that states it.
#[derive(Clone, Debug, Default)]
pub(super) struct Parts {
    /// Cut-outs.
    pub cutouts: Vec<(Patch, Span)>,
    /// Feet.
    pub feet: Option<Feet>,
    /// Ribs.
    pub ribs: Vec<(Rib, Span)>,
}

/// Reads cut-outs, feet and ribs of a plate; none when one is faulty.
pub(super) fn read(
    plate: &Record,
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Option<Parts> {
    let before = collector.count();
    let cutouts = cutouts(plate, outline, collector);
    let feet = feet(plate, outline, collector);
    let ribs = ribs(plate, outline, collector);
    let whole = !["cutouts", "feet", "ribs"]
        .iter()
        .any(|key| plate.is_faulty(key));
    (whole && collector.count() == before).then_some(Parts {
        cutouts,
        feet,
        ribs,
    })
}

fn cutouts(
    plate: &Record,
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Vec<(Patch, Span)> {
    let cutouts = patches(plate.records("cutouts"), &plate.span("cutouts"), collector);
    let Some(outline) = outline else {
        return cutouts;
    };
    let [left, lower, right, upper] = outline.bounds();
    for (cutout, span) in &cutouts {
        let [from, below, to, above] = cutout.bounds();
        let inside = from >= left - SAME_PLACE
            && below >= lower - SAME_PLACE
            && to <= right + SAME_PLACE
            && above <= upper + SAME_PLACE;
        collector.require(inside, || beyond("cut-out", plate, span));
    }
    let shapes: Vec<Patch> = cutouts.iter().map(|(cutout, _)| cutout.clone()).collect();
    collector.require(shapes.is_empty() || !swallowed(outline, &shapes), || {
        fault(
            "plate/swallowed",
            &plate.span("cutouts"),
            "the cut-outs leave nothing of the plate",
        )
        .expecting("expected some plate between them")
        .help("a cut-out is what is missing, in the plate's own coordinates: `cutouts = [{ centre = [\"40 mm\", \"30 mm\"], diameter = \"12 mm\" }]`")
    });
    cutouts
}

fn feet(plate: &Record, outline: Option<&Outline>, collector: &mut Collector) -> Option<Feet> {
    let record = plate.record("feet")?;
    if record.has("at") && !record.is_faulty("at") && record.records("at").is_empty() {
        collector.report(missing(
            record,
            "at",
            "at = [{ centre = [\"10 mm\", \"10 mm\"], diameter = \"16 mm\" }]",
        ));
    }
    let feet = patches(record.records("at"), &record.span("at"), collector);
    for (foot, span) in &feet {
        let held = outline.is_none_or(|outline| holds_patch(outline, foot));
        collector.require(held, || beyond("foot", plate, span));
    }
    Some(Feet {
        height: record.number("height")?,
        at: feet.into_iter().map(|(foot, _)| foot).collect(),
    })
}

fn ribs(plate: &Record, outline: Option<&Outline>, collector: &mut Collector) -> Vec<(Rib, Span)> {
    let records = plate.records("ribs");
    let heights = distinct_heights(records.iter().filter_map(|rib| rib.number("height")));
    collector.require(heights.len() <= MOST_HEIGHTS, || {
        fault(
            "plate/rib-heights",
            &plate.span("ribs"),
            format!("the ribs have {} different heights", heights.len()),
        )
        .expecting(format!("expected at most {MOST_HEIGHTS}"))
        .help("give ribs of nearly the same height one height")
    });
    let mut ribs = Vec::with_capacity(records.len());
    if !few_enough("ribs", records, &plate.span("ribs"), collector) {
        return ribs;
    }
    for record in records {
        let Some(patch) = patch(record, collector) else {
            continue;
        };
        let held = outline.is_none_or(|outline| holds_patch(outline, &patch));
        collector.require(held, || beyond("rib", plate, &record.place));
        if let Some(height) = record.number("height") {
            ribs.push((Rib { patch, height }, record.place.clone()));
        }
    }
    ribs
}

/// A part that is not wholly on its plate.
fn beyond(part: &str, plate: &Record, span: &Span) -> Fault {
    fault(
        "plate/part-outside",
        span,
        format!("this {part} reaches beyond `{}`", plate.path),
    )
    .expecting("expected inside the plate")
    .help(
        "its place is in the plate's own coordinates: from its lower left corner (round: from its \
         centre; outline: as the points of the outline)",
    )
}

fn patches(records: &[Record], span: &Span, collector: &mut Collector) -> Vec<(Patch, Span)> {
    if !few_enough("a list of parts", records, span, collector) {
        return Vec::new();
    }
    let read = records.iter().filter_map(|record| {
        let patch = patch(record, collector)?;
        Some((patch, record.place.clone()))
    });
    read.collect()
}

fn few_enough(what: &str, records: &[Record], span: &Span, collector: &mut Collector) -> bool {
    let few = records.len() <= MOST_PATCHES;
    collector.require(few, || more_than(MOST_PATCHES, what, span, records.len()));
    few
}

/// Reads a part in plan: a rectangle or a disc about a centre, or an outline.
fn patch(record: &Record, collector: &mut Collector) -> Option<Patch> {
    let stated: Vec<&str> = ["size", "diameter", "outline"]
        .into_iter()
        .filter(|key| record.has(key))
        .collect();
    match stated.as_slice() {
        ["outline"] if record.has("centre") => {
            collector.report(two_ways(record, ["centre", "outline"]));
            None
        }
        ["outline"] => Some(Patch::Polygon {
            points: outline(record, collector)?,
        }),
        [key] => {
            if !record.has("centre") {
                collector.report(missing(record, "centre", "centre = [\"40 mm\", \"30 mm\"]"));
            }
            let centre = record.point("centre");
            Some(if *key == "size" {
                Patch::Rectangle {
                    size: record.point("size")?,
                    centre: centre?,
                }
            } else {
                Patch::Disc {
                    radius: record.number("diameter")? / 2.0,
                    centre: centre?,
                }
            })
        }
        [first, second, ..] => {
            collector.report(two_ways(record, [first, second]));
            None
        }
        [] => {
            collector.report(
                missing(record, "size", "size = [\"20 mm\", \"10 mm\"]").help(
                    "for example `centre = [\"40 mm\", \"30 mm\"], size = [\"20 mm\", \"10 mm\"]`, \
                     or `diameter`, or `outline`",
                ),
            );
            None
        }
    }
}

/// Reads an outline by points: a simple polygon.
pub(super) fn outline(record: &Record, collector: &mut Collector) -> Option<Arc<[Point]>> {
    let stated = record.points("outline")?;
    if stated.len() > MOST_POINTS {
        collector.report(more_than(
            MOST_POINTS,
            "outline",
            &record.span("outline"),
            stated.len(),
        ));
        return None;
    }
    let told = unsound(stated, &record.span("outline"));
    if let Some(told) = told {
        collector.report(told);
        return None;
    }
    Some(stated.iter().map(|(point, _)| *point).collect())
}

/// What is wrong with an outline.
fn unsound(stated: &[(Point, Span)], span: &Span) -> Option<Fault> {
    if stated.len() < 3 {
        return Some(
            fault(
                "outline/points",
                span,
                format!(
                    "an outline of {} point{} encloses nothing",
                    stated.len(),
                    if stated.len() == 1 { "" } else { "s" }
                ),
            )
            .expecting("expected three points or more")
            .help(
                "for example `outline = [[\"0 mm\", \"0 mm\"], [\"80 mm\", \"0 mm\"], \
                 [\"80 mm\", \"60 mm\"]]`; a rectangle is shorter as `size`",
            ),
        );
    }
    for (index, (point, span)) in stated.iter().enumerate() {
        let before = stated[..index]
            .iter()
            .position(|(other, _)| (point[0] - other[0]).hypot(point[1] - other[1]) <= SAME_PLACE);
        if let Some(before) = before {
            let help = if before == 0 && index + 1 == stated.len() {
                "leave the last point out: the outline closes by itself"
            } else {
                "leave one of the two out"
            };
            return Some(
                fault(
                    "outline/points",
                    span,
                    format!("point {} is also point {}", index + 1, before + 1),
                )
                .expecting("expected another point")
                .help(help),
            );
        }
    }
    let points: Vec<Point> = stated.iter().map(|(point, _)| *point).collect();
    let [left, lower, right, upper] = polygon::bounds(&points);
    let extent = (right - left).hypot(upper - lower);
    if let Some([first, second]) = polygon::first_meeting(&points, SAME_PLACE) {
        let neighbours = second == first + 1 || first == 0 && second + 1 == points.len();
        if neighbours && polygon::area(&points) <= NO_AREA * extent * extent {
            return Some(no_area(span));
        }
        let edge = |from: usize| format!("{} to {}", from + 1, (from + 1) % points.len() + 1);
        return Some(
            fault(
                "outline/crossing",
                &stated[second].1,
                format!(
                    "the edge from point {} meets the edge from point {}",
                    edge(second),
                    edge(first)
                ),
            )
            .expecting("expected an outline that does not meet itself")
            .help("list the points in the order in which they follow each other along the edge"),
        );
    }
    (polygon::area(&points) <= NO_AREA * extent * extent).then(|| no_area(span))
}

fn no_area(span: &Span) -> Fault {
    fault("outline/no-area", span, "the outline encloses no area")
        .expecting("expected points that are not on one line")
        .help("the smallest outline is a triangle: `outline = [[\"0 mm\", \"0 mm\"], [\"80 mm\", \"0 mm\"], [\"0 mm\", \"60 mm\"]]`")
}

/// A bolt where it passes a plate.
#[derive(Clone, Copy, Debug)]
pub(super) struct Passing<'n> {
    /// Its axis in the plate's own coordinates, m.
    pub axis: Point,
    /// Its hole radius, m.
    pub hole: f64,
    /// What presses on the outer face: `head` or `nut`.
    pub part: &'n str,
    /// Outer radius of that seat, m; zero where there is none.
    pub seat: f64,
    /// Its place in the words of the file.
    pub place: &'n str,
    /// Name of the plate.
    pub plate: &'n str,
}

impl Parts {
    /// What of a bolt reaches into a cut-out or onto a rib.
    pub(super) fn clash(&self, bolt: Passing<'_>) -> Option<Fault> {
        // Farther away than the radius is clear.
        let touches = |patch: &Patch, radius: f64| patch.depth(bolt.axis) > SAME_PLACE - radius;
        let clear = |radius: f64, of: &str| {
            format!(
                "expected at least {} from the {of}",
                units::show(radius, Quantity::Length)
            )
        };
        for (cutout, _) in &self.cutouts {
            let (what, radius) = if touches(cutout, bolt.hole) {
                ("hole", bolt.hole)
            } else if touches(cutout, bolt.seat) {
                (bolt.part, bolt.seat)
            } else {
                continue;
            };
            return Some(
                fault(
                    "plate/bolt-in-cutout",
                    &(0..0),
                    format!(
                        "the {what} at {} reaches into a cut-out of plate `{}`",
                        bolt.place, bolt.plate
                    ),
                )
                .expecting(clear(radius, "cut-out"))
                .help("move the bolt, or make the cut-out smaller"),
            );
        }
        let mut ribs = self.ribs.iter().filter(|_| bolt.seat > 0.0);
        let (rib, _) = ribs.find(|(rib, _)| touches(&rib.patch, bolt.seat))?;
        Some(
            fault(
                "plate/head-on-rib",
                &(0..0),
                format!(
                    "the {} at {} would stand on a rib, {} above plate `{}`",
                    bolt.part,
                    bolt.place,
                    units::show(rib.height, Quantity::Length),
                    bolt.plate
                ),
            )
            .expecting(clear(bolt.seat, "rib"))
            .help("move the bolt or end the rib before it: the seat must lie on the plate itself"),
        )
    }
}
