//! Places of fasteners: listed, or by rule.

use std::f64::consts::TAU;

use crate::{
    joint::{
        MOST_PLACES, Outline,
        collector::{Collector, Wording, fault},
        plates::two_ways,
        record::{Point, Record},
        tree::Span,
        walk::{missing, too_many},
    },
    units::{self, Quantity},
};

/// A place with the bytes that state it.
pub(super) type Place = (Point, Span);

/// Reads the places of a fastener group on a first plate of known outline.
pub(super) fn read(
    record: &Record,
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Option<Vec<Place>> {
    let places = match (record.has("at"), record.has("pattern")) {
        (true, true) => {
            collector.report(two_ways(record, ["at", "pattern"]));
            return None;
        }
        (true, false) => record.points("at")?.to_vec(),
        (false, true) => by_rule(record.record("pattern")?, outline, collector)?,
        (false, false) => {
            collector.report(no_place(record, &record.place));
            return None;
        }
    };
    if places.is_empty() {
        collector.report(no_place(record, &record.span("at")));
        return None;
    }
    if let Some(counts) = record.counts("count") {
        let count: usize = counts
            .iter()
            .fold(1, |all, count| all.saturating_mul(*count));
        collector.require(count == places.len(), || {
            fault(
                "fastener/count",
                &record.span("count"),
                format!("`count` is {count}, but {} places are given", places.len()),
            )
            .expecting(format!("expected {}", places.len()))
        });
    }
    Some(places)
}

fn no_place(record: &Record, span: &Span) -> crate::diagnostic::Fault {
    fault(
        "fastener/no-place",
        span,
        format!("`{}` stands nowhere", record.path),
    )
    .expecting("expected `at` or `pattern`")
    .help("for example `at = [[\"10 mm\", \"10 mm\"]]` or `pattern = { kind = \"grid\", count = [3, 2], margin = \"7 mm\" }`")
}

fn by_rule(
    record: &Record,
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Option<Vec<Place>> {
    let kind = record.text("kind")?;
    let counts = record.counts("count")?;
    let total = counts
        .iter()
        .try_fold(1_usize, |product, count| product.checked_mul(*count))
        .unwrap_or(usize::MAX);
    if total > MOST_PLACES {
        collector.report(too_many("pattern", &record.span("count"), total));
        return None;
    }
    let points = match (kind, counts) {
        ("grid", &[columns, rows]) => grid(record, [columns, rows], outline, collector)?,
        ("edge", &[columns, rows]) => {
            let all = grid(record, [columns, rows], outline, collector)?;
            all.into_iter()
                .enumerate()
                .filter(|(index, _)| {
                    let (column, row) = (index % columns, index / columns);
                    column == 0 || row == 0 || column + 1 == columns || row + 1 == rows
                })
                .map(|(_, point)| point)
                .collect()
        }
        ("edge" | "circle", &[count]) => circle(record, count, outline, collector)?,
        _ => {
            let expected = if kind == "circle" {
                "expected one number, such as `6`"
            } else {
                "expected two numbers, such as `[3, 2]`"
            };
            collector.report(
                fault(
                    "file/wrong-type",
                    &record.span("count"),
                    format!("a pattern of kind `{kind}` cannot be counted so"),
                )
                .expecting(expected),
            );
            return None;
        }
    };
    let span = record.place.clone();
    Some(
        points
            .into_iter()
            .map(|point| (point, span.clone()))
            .collect(),
    )
}

/// Columns and rows, either within a margin or from a first bolt by a pitch.
fn grid(
    record: &Record,
    counts: [usize; 2],
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Option<Vec<Point>> {
    let (first, pitch) = if record.has("first") || record.has("pitch") {
        for key in ["first", "pitch"] {
            if !record.has(key) {
                collector.report(missing(
                    record,
                    key,
                    &format!("{key} = [\"10 mm\", \"10 mm\"]"),
                ));
            }
        }
        (record.point("first")?, record.point("pitch")?)
    } else {
        within_margin(record, counts, outline, collector)?
    };
    let mut points = Vec::with_capacity(counts[0] * counts[1]);
    for row in 0..counts[1] {
        for column in 0..counts[0] {
            points.push([
                first[0] + column as f64 * pitch[0],
                first[1] + row as f64 * pitch[1],
            ]);
        }
    }
    Some(points)
}

fn within_margin(
    record: &Record,
    counts: [usize; 2],
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Option<(Point, Point)> {
    if !record.has("margin") {
        collector.report(missing(record, "margin", "margin = \"7 mm\""));
    }
    let margin = record.number("margin")?;
    let [low, high] = outline?.corners();
    let crowded = (0..2).find(|axis| counts[*axis] > 1 && 2.0 * margin > high[*axis] - low[*axis]);
    if let Some(axis) = crowded {
        collector.report(no_room(record, margin, 0.5 * (high[axis] - low[axis])));
        return None;
    }
    let along = |axis: usize| {
        let (from, to) = (low[axis] + margin, high[axis] - margin);
        if counts[axis] == 1 {
            (f64::midpoint(from, to), 0.0)
        } else {
            (from, (to - from) / (counts[axis] - 1) as f64)
        }
    };
    let (across, up) = (along(0), along(1));
    Some(([across.0, up.0], [across.1, up.1]))
}

/// A margin that leaves nothing between it and that of the other side: bolts would change places.
fn no_room(record: &Record, margin: f64, most: f64) -> crate::diagnostic::Fault {
    let [margin, most] = [margin, most].map(|length| units::show(length, Quantity::Length));
    fault(
        "value/range",
        &record.span("margin"),
        format!("a margin of {margin} reaches past the middle of the first plate"),
    )
    .expecting(format!("at most {most}"))
    .help("`margin` is the distance of the outer bolts from the edges of the first plate")
}

/// Bolts on a circle: of a diameter, or within a margin of a round plate's edge.
fn circle(
    record: &Record,
    count: usize,
    outline: Option<&Outline>,
    collector: &mut Collector,
) -> Option<Vec<Point>> {
    let radius = match (record.has("diameter"), record.has("margin"), outline) {
        (true, true, _) => {
            collector.report(two_ways(record, ["diameter", "margin"]));
            return None;
        }
        (true, false, _) => record.number("diameter")? / 2.0,
        (false, true, Some(Outline::Disc { radius })) => {
            let margin = record.number("margin")?;
            if margin > *radius {
                collector.report(no_room(record, margin, *radius));
                return None;
            }
            *radius - margin
        }
        (false, true, None) => return None,
        (false, _, _) => {
            collector.report(missing(record, "diameter", "diameter = \"50 mm\""));
            return None;
        }
    };
    let centre = match record.point("centre") {
        Some(centre) => centre,
        None if record.has("centre") => return None,
        None => outline?.centre(),
    };
    let start = match record.number("start") {
        None if record.has("start") => return None,
        start => start.unwrap_or(0.0),
    };
    Some(
        (0..count)
            .map(|bolt| {
                let angle = start + TAU * bolt as f64 / count as f64;
                [
                    centre[0] + radius * angle.cos(),
                    centre[1] + radius * angle.sin(),
                ]
            })
            .collect(),
    )
}
