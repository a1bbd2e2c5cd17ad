//! Groups of like fasteners, and whether they fit the plates.

use crate::{
    catalog::{self, Grade, Thread},
    joint::{
        Engagement, Fastener, MOST_PLACES,
        collector::{Collector, Wording, fault},
        geometry::depth_at,
        patterns,
        plates::PlateDraft,
        record::Record,
        seats::{self, Bolt, Seats, unknown_plate},
        tightening,
        tree::{Span, short},
        walk::too_many,
    },
    units::{self, Quantity},
};

/// A fastener group with the place of each of its bolts in the text.
#[derive(Debug)]
pub(super) struct Group {
    /// The group.
    pub fastener: Fastener,
    /// Bytes that state each place.
    pub spans: Vec<Span>,
}

/// Touching within this is not yet a fault, m.
const SLACK: f64 = 1e-9;

/// Reads all fastener groups; none when one of them is faulty.
pub(super) fn read(
    file: &Record,
    plates: &[PlateDraft; 2],
    collector: &mut Collector,
) -> Option<Vec<Group>> {
    let records = file.records("fastener");
    if records.is_empty() && file.has("fastener") && file.span("fastener").is_empty() {
        return None;
    }
    let mut groups = Vec::with_capacity(records.len());
    for record in records {
        groups.extend(group(record, plates, collector));
    }
    let bolts: usize = groups.iter().map(|group| group.spans.len()).sum();
    if bolts > MOST_PLACES {
        collector.report(too_many("fastener", &file.span("fastener"), bolts));
        return None;
    }
    for group in &groups {
        fits(group, plates, collector);
    }
    apart(&groups, collector);
    (groups.len() == records.len() && !groups.is_empty()).then_some(groups)
}

fn group(record: &Record, plates: &[PlateDraft; 2], collector: &mut Collector) -> Option<Group> {
    let thread = thread(record, collector);
    let grade = thread.and_then(|thread| grade(record, thread, collector));
    let head_plate = head_plate(record, plates, collector);
    let tightening = tightening::read(record, collector);
    let places = patterns::read(record, plates[0].outline, collector);
    let thread = thread?;
    let head_plate = head_plate?;
    let engagement = engagement(record, thread, &plates[1 - head_plate], collector)?;
    let bolt = Bolt {
        record,
        thread,
        engagement,
        head_plate,
    };
    let hole_radius = seats::holes(bolt, plates, collector)?;
    let seats = seats::read(bolt, hole_radius, collector);
    let Seats {
        head: head_seat,
        nut: nut_seat,
        friction_radius,
        conical: conical_seat,
        washer_thickness,
    } = seats?;
    let shank_path = match record.flag("shank_path") {
        None if record.has("shank_path") => return None,
        flag => flag.unwrap_or(true),
    };
    let (places, spans) = places?.into_iter().unzip();
    Some(Group {
        fastener: Fastener {
            thread: thread.clone(),
            grade: grade?.clone(),
            head_seat,
            nut_seat,
            friction_radius,
            conical_seat,
            hole_radius,
            washer_thickness,
            engagement,
            tightening: tightening?,
            head_plate,
            shank_path,
            places,
        },
        spans,
    })
}

fn thread(record: &Record, collector: &mut Collector) -> Option<&'static Thread> {
    let name = record.text("thread")?;
    let thread = catalog::thread(name);
    if thread.is_none() {
        let known = catalog::threads().iter().map(|thread| thread.name.as_str());
        collector.report(
            fault(
                "name/unknown",
                &record.span("thread"),
                format!("no thread is called `{}`", short(name)),
            )
            .expecting("expected a thread such as `M5` or `1/4-20`")
            .help("`ringsum list threads` names all")
            .nearest(name, known),
        );
    }
    thread
}

fn grade(record: &Record, thread: &Thread, collector: &mut Collector) -> Option<&'static Grade> {
    let name = record.text("grade")?;
    let grade = catalog::grade(name, thread.diameter);
    if grade.is_none() {
        let known = catalog::grades().iter().map(|grade| grade.name.as_str());
        collector.report(
            fault(
                "name/unknown",
                &record.span("grade"),
                format!("no strength grade `{}` for {}", short(name), thread.name),
            )
            .expecting("expected a grade such as `8.8` or `A2-70`")
            .help("`ringsum list grades` names all")
            .nearest(name, known),
        );
    }
    grade
}

fn head_plate(
    record: &Record,
    plates: &[PlateDraft; 2],
    collector: &mut Collector,
) -> Option<usize> {
    let Some(name) = record.text("from") else {
        return (!record.has("from")).then_some(0);
    };
    let place = plates.iter().position(|plate| plate.name == name);
    if place.is_none() {
        collector.report(unknown_plate(name, &record.span("from"), plates));
    }
    place
}

fn engagement(
    record: &Record,
    thread: &Thread,
    far: &PlateDraft,
    collector: &mut Collector,
) -> Option<Engagement> {
    let table = match record.record("engagement") {
        Some(table) => table,
        None if record.has("engagement") => return None,
        None => {
            collector.assume(record.at("engagement"), "nut", "not stated");
            return Some(Engagement::Nut);
        }
    };
    let kind = table.text("kind")?;
    if kind == "nut" {
        return Some(Engagement::Nut);
    }
    let length = match table.number("length") {
        Some(length) => length,
        None if table.has("length") => return None,
        None => {
            let thickness = far.thickness?;
            let (length, why) = if kind == "insert" {
                (
                    thickness.min(1.5 * thread.diameter),
                    "not stated; inserts are usually 1.5 diameters long",
                )
            } else {
                (thickness, "not stated; the thread goes through the plate")
            };
            collector.assume(
                table.at("length"),
                units::show(length, Quantity::Length),
                why,
            );
            length
        }
    };
    Some(if kind == "insert" {
        Engagement::Insert { length }
    } else {
        Engagement::Tapped { length }
    })
}

/// Every hole and every seat must lie on its plate.
fn fits(group: &Group, plates: &[PlateDraft; 2], collector: &mut Collector) {
    let fastener = &group.fastener;
    for (point, span) in fastener.places.iter().zip(&group.spans) {
        for (index, plate) in plates.iter().enumerate() {
            let Some((outline, origin)) = plate.placed() else {
                continue;
            };
            if collector.is_full() {
                return;
            }
            let depth = depth_at(outline, origin, *point);
            let hole = fastener.hole_radius[index];
            if depth + SLACK < hole {
                collector.report(hole_outside(point, span, plate));
                continue;
            }
            let (seat, part) = if index == fastener.head_plate {
                (Some(fastener.head_seat), "head")
            } else {
                (fastener.nut_seat, "nut")
            };
            if let Some(seat) = seat
                && depth + SLACK < seat.outer_radius
            {
                collector.report(
                    fault(
                        "plate/head-beyond-edge",
                        span,
                        format!(
                            "the {part} at {} reaches beyond the edge of plate `{}`",
                            shown(point),
                            plate.name
                        ),
                    )
                    .expecting(format!(
                        "expected at least {} from the edge",
                        units::show(seat.outer_radius, Quantity::Length)
                    )),
                );
            }
        }
    }
}

fn hole_outside(point: &[f64; 2], span: &Span, plate: &PlateDraft) -> crate::diagnostic::Fault {
    fault(
        "plate/hole-outside",
        span,
        format!(
            "the hole at {} does not lie inside plate `{}`",
            shown(point),
            plate.name
        ),
    )
    .expecting(format!("expected on plate `{}`", plate.name))
    .help("`at` is measured from the lower left corner of the first plate (round: its centre)")
}

/// No two holes or heads may share the same land.
fn apart(groups: &[Group], collector: &mut Collector) {
    let mut bolts: Vec<(&Fastener, [f64; 2], &Span)> = groups
        .iter()
        .flat_map(|group| {
            let fastener = &group.fastener;
            fastener
                .places
                .iter()
                .zip(&group.spans)
                .map(move |(point, span)| (fastener, *point, span))
        })
        .collect();
    bolts.sort_by(|one, other| one.1[0].total_cmp(&other.1[0]));
    let widest = bolts
        .iter()
        .map(|(fastener, ..)| 2.0 * reach(fastener))
        .fold(0.0, f64::max);
    for (index, (fastener, point, span)) in bolts.iter().enumerate() {
        for (other, place, other_span) in &bolts[index + 1..] {
            if place[0] - point[0] > widest || collector.is_full() {
                break;
            }
            let distance = (place[0] - point[0]).hypot(place[1] - point[1]);
            let later = if other_span.start >= span.start {
                other_span
            } else {
                span
            };
            let pairs = [0, 1].map(|plate| fastener.hole_radius[plate] + other.hole_radius[plate]);
            let (code, what) = if distance + SLACK < pairs[0].max(pairs[1]) {
                ("plate/holes-overlap", "holes")
            } else if distance + SLACK < seats_reach(fastener, other) {
                ("plate/heads-overlap", "heads or nuts")
            } else {
                continue;
            };
            collector.report(
                fault(
                    code,
                    later,
                    format!(
                        "the {what} at {} and {} overlap",
                        shown(point),
                        shown(place)
                    ),
                )
                .expecting(format!(
                    "{} from its neighbour",
                    units::show(distance, Quantity::Length)
                )),
            );
        }
    }
}

/// The distance below which a seat of one bolt meets a seat of the other on the same face, m.
fn seats_reach(one: &Fastener, other: &Fastener) -> f64 {
    (0..2)
        .filter_map(|plate| Some(seat_on(one, plate)? + seat_on(other, plate)?))
        .fold(0.0, f64::max)
}

fn seat_on(fastener: &Fastener, plate: usize) -> Option<f64> {
    if plate == fastener.head_plate {
        Some(fastener.head_seat.outer_radius)
    } else {
        fastener.nut_seat.map(|seat| seat.outer_radius)
    }
}

fn reach(fastener: &Fastener) -> f64 {
    let nut = fastener.nut_seat.map_or(0.0, |seat| seat.outer_radius);
    fastener.head_seat.outer_radius.max(nut)
}

fn shown(point: &[f64; 2]) -> String {
    format!(
        "({}, {})",
        units::show(point[0], Quantity::Length),
        units::show(point[1], Quantity::Length)
    )
}
