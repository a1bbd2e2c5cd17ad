//! Where heads, washers and nuts press, and the holes they stand over.

mod hardware;
mod parts;

use crate::{
    catalog::{self, SeatRecord, Status, Thread},
    diagnostic::Fault,
    joint::{
        Engagement, Hardware, MOST_PLATES, Seat,
        collector::{Collector, Wording, fault},
        contact::one_for_each,
        plates::PlateDraft,
        record::{PerPlate, Record},
        tree::{Span, short},
        walk::missing,
    },
    units::{self, Quantity},
};

pub(super) use parts::{HEADS, Parts};

/// A washer spreads the pressure of the head by this multiple of its thickness in diameter
/// (a rule of the kind VDI 2230 uses, from memory).
const WASHER_SPREAD: f64 = 1.6;

/// Hole at the face of a plate that holds the thread, in diameters of the thread: from a tapped hole to one
/// recessed or with an insert, of which the widest have twice the diameter (common practice, no source).
const NARROWEST_MOUTH: f64 = 0.5;
const WIDEST_MOUTH: f64 = 2.5;

/// What head and nut press on.
#[derive(Clone, Copy, Debug)]
pub(super) struct Seats {
    /// Seat of the head or its washer.
    pub head: Seat,
    /// Seat of the nut or its washer.
    pub nut: Option<Seat>,
    /// Mean radius of the annulus that turns, m.
    pub friction_radius: f64,
    /// Whether the head is countersunk.
    pub conical: bool,
    /// Washers in the grip, m.
    pub washer_thickness: f64,
    /// How many.
    pub washers: u32,
    /// Volumes of head, nut and washers.
    pub hardware: Hardware,
    /// Whether the head is a cylinder rather than a hexagon.
    pub cylindrical: bool,
}

/// What the seats depend on.
#[derive(Clone, Copy, Debug)]
pub(super) struct Bolt<'a> {
    /// The fastener's table.
    pub record: &'a Record,
    /// Its thread.
    pub thread: &'a Thread,
    /// How the far end holds.
    pub engagement: Engagement,
    /// Plate on which the head sits.
    pub head_plate: usize,
    /// Head and washers.
    pub parts: Parts,
}

/// Reads the hole radius in each plate, m; 0 beyond the last.
pub(super) fn holes(
    bolt: Bolt<'_>,
    plates: &[PlateDraft],
    collector: &mut Collector,
) -> Option<[f64; MOST_PLATES]> {
    let far = plates.len() - 1 - bolt.head_plate;
    let threaded = !matches!(bolt.engagement, Engagement::Nut);
    let stated = stated_holes(bolt, plates, collector)?;
    let mut radii = [0.0; MOST_PLATES];
    let mut assumed = None;
    for (plate, radius) in radii.iter_mut().take(plates.len()).enumerate() {
        let own = match plates[plate].record.number("hole") {
            None if plates[plate].record.has("hole") => return None,
            own => own,
        };
        let diameter = match own.or(stated.of(plate)) {
            Some(diameter) => diameter,
            // A thread or an insert fills its hole; there is no clearance.
            None if threaded && plate == far => bolt.thread.diameter,
            None => match assumed {
                Some(diameter) => diameter,
                None => *assumed.insert(medium_hole(bolt, collector)?),
            },
        };
        let record = match own {
            Some(_) => &plates[plate].record,
            None => bolt.record,
        };
        let span = || record.span("hole");
        if let Some(fault) = unfit(bolt.thread, (diameter, threaded && plate == far), span) {
            collector.report(fault);
            return None;
        }
        *radius = diameter / 2.0;
    }
    Some(radii)
}

/// What is wrong with a hole, m, that a thread passes or that holds it.
fn unfit(
    thread: &Thread,
    (diameter, holds_it): (f64, bool),
    span: impl Fn() -> Span,
) -> Option<Fault> {
    let show = |value| units::show(value, Quantity::Length);
    let [least, most] = if holds_it {
        [NARROWEST_MOUTH, WIDEST_MOUTH].map(|share| share * thread.diameter)
    } else {
        [thread.diameter, f64::INFINITY]
    };
    let (name, hole) = (&thread.name, show(diameter));
    if diameter <= least {
        let found = format!("{name} does not pass a hole of {hole}");
        let fault = fault("plate/hole-too-small", &span(), found);
        return Some(fault.expecting(format!("expected above {}", show(least))));
    }
    (diameter > most).then(|| {
        fault(
            "plate/hole-too-wide",
            &span(),
            format!("{name} finds no thread in a hole of {hole}"),
        )
        .expecting(format!("expected at most {}", show(most)))
        .help("of a plate that holds the thread leave `hole` out, or give that of the insert")
    })
}

/// Hole diameters as the fastener states them.
#[derive(Clone, Copy, Debug)]
struct StatedHoles([Option<f64>; MOST_PLATES]);

impl StatedHoles {
    fn of(self, plate: usize) -> Option<f64> {
        self.0[plate]
    }
}

fn stated_holes(
    bolt: Bolt<'_>,
    plates: &[PlateDraft],
    collector: &mut Collector,
) -> Option<StatedHoles> {
    let record = bolt.record;
    match record.per_plate("hole") {
        None if record.has("hole") => None,
        None => Some(StatedHoles([None; MOST_PLATES])),
        Some(PerPlate::Each(each)) => {
            one_for_each(record, ("hole", each), plates, collector)?;
            let mut diameters = [None; MOST_PLATES];
            for (diameter, stated) in diameters.iter_mut().zip(each) {
                *diameter = Some(*stated);
            }
            Some(StatedHoles(diameters))
        }
        Some(PerPlate::Both(diameter)) => Some(StatedHoles(clear_of_thread(
            bolt,
            plates.len(),
            Some(*diameter),
        ))),
        Some(PerPlate::Named { others, named }) => {
            let mut diameters = clear_of_thread(bolt, plates.len(), *others);
            for (name, span, diameter) in named {
                let place = plates.iter().position(|plate| plate.name == *name);
                let Some(place) = place else {
                    collector.report(unknown_plate(name, span, plates));
                    return None;
                };
                diameters[place] = Some(*diameter);
            }
            Some(StatedHoles(diameters))
        }
    }
}

/// One diameter for every plate but that which holds the thread.
fn clear_of_thread(
    bolt: Bolt<'_>,
    plates: usize,
    diameter: Option<f64>,
) -> [Option<f64>; MOST_PLATES] {
    let mut all = [diameter; MOST_PLATES];
    if !matches!(bolt.engagement, Engagement::Nut) {
        all[plates - 1 - bolt.head_plate] = None;
    }
    all
}

/// A name that no plate has.
pub(super) fn unknown_plate(name: &str, span: &Span, plates: &[PlateDraft]) -> Fault {
    let names = || plates.iter().map(|plate| plate.name.as_str());
    fault(
        "name/unknown",
        span,
        format!("no plate is called `{}`", short(name)),
    )
    .expecting(format!(
        "expected {}",
        crate::joint::fields::listed(&names().collect::<Vec<_>>())
    ))
    .nearest(name, names())
}

fn medium_hole(bolt: Bolt<'_>, collector: &mut Collector) -> Option<f64> {
    let Some(hole) = catalog::clearance_hole(&bolt.thread.name) else {
        collector.report(
            missing(bolt.record, "hole", "hole = \"4.5 mm\"").help(format!(
                "the catalogue has no clearance hole for {}; state `hole`",
                bolt.thread.name
            )),
        );
        return None;
    };
    let diameter = hole.diameters[1];
    collector.assume(
        bolt.record.at("hole"),
        units::show(diameter, Quantity::Length),
        format!("medium clearance hole of {}", hole.standard),
    );
    Some(diameter)
}

/// Reads the seats of head and nut over holes of known radius, m.
pub(super) fn read(
    bolt: Bolt<'_>,
    [near, far]: [f64; 2],
    collector: &mut Collector,
) -> Option<Seats> {
    let record = bolt.record;
    let head = bolt.parts.head;
    let bearing = record.number("bearing");
    if record.has("bearing") && bearing.is_none() {
        return None;
    }
    if let Some(head) = head
        && head.status == Status::Judgement
        && bearing.is_none()
    {
        collector.assume(
            record.at("bearing"),
            units::show(head.outer, Quantity::Length),
            format!("{}: {}", head.standard, head.source),
        );
    }
    let [head_washer, nut_washer] = bolt.parts.washers?;
    let conical = head.is_some_and(|head| head.kind == "countersunk") && bearing.is_none();
    let (head_seat, friction_radius) = match (bearing, head) {
        (Some(diameter), _) => {
            let seat = annulus(bolt, [2.0 * near, diameter], collector)?;
            let own = head.and_then(|head| turning(bolt, (head, head_washer), diameter));
            if let Some(radius) = own {
                collector.assume(
                    record.at("bearing"),
                    format!("friction of the head at {}", units::show(2.0 * radius, Quantity::Length)),
                    "the head is narrower than its bearing and turns on its own annulus, by mean diameter",
                );
            }
            (seat, own.unwrap_or_else(|| mean_radius(seat)))
        }
        (None, Some(head)) => pressed(bolt, [Some(head), head_washer], near, collector)?,
        (None, None) => return None,
    };
    let nut = match (bolt.engagement, bearing) {
        (Engagement::Nut, Some(diameter)) => Some(annulus(bolt, [2.0 * far, diameter], collector)?),
        (Engagement::Nut, None) => {
            let nut = catalog::seat("nut", &bolt.thread.name);
            if nut.is_none() {
                collector.report(parts::no_seat(record, bolt.thread, "nut"));
            }
            Some(pressed(bolt, [Some(nut?), nut_washer], far, collector)?.0)
        }
        _ => None,
    };
    let thickness = |washer: Option<&SeatRecord>| washer.and_then(|washer| washer.height);
    Some(Seats {
        head: head_seat,
        nut,
        friction_radius,
        conical,
        washer_thickness: thickness(head_washer).unwrap_or(0.0)
            + thickness(nut_washer).unwrap_or(0.0),
        washers: u32::from(head_washer.is_some()) + u32::from(nut_washer.is_some()),
        hardware: hardware::of(bolt, [head_washer, nut_washer]),
        cylindrical: head.is_some_and(|head| head.kind != "hex"),
    })
}

/// Seat on the plate and friction radius of a head or nut that may stand on a washer.
fn pressed(
    bolt: Bolt<'_>,
    [part, washer]: [Option<&SeatRecord>; 2],
    hole_radius: f64,
    collector: &mut Collector,
) -> Option<(Seat, f64)> {
    let part = part?;
    let Some(washer) = washer else {
        let inner = part.inner.unwrap_or(0.0).max(2.0 * hole_radius);
        let seat = annulus(bolt, [inner, part.outer], collector)?;
        return Some((seat, mean_radius(seat)));
    };
    let washer_hole = washer.inner.unwrap_or(bolt.thread.diameter);
    let turned = annulus(
        bolt,
        [part.inner.unwrap_or(0.0).max(washer_hole), part.outer],
        collector,
    )?;
    let spread = part.outer + WASHER_SPREAD * washer.height.unwrap_or(0.0);
    let outer = washer.outer.min(spread);
    let seat = annulus(bolt, [washer_hole.max(2.0 * hole_radius), outer], collector)?;
    Some((seat, mean_radius(turned)))
}

/// Mean radius at which a head turns on something wider of a stated bearing diameter, m; none where it
/// covers the bearing.
fn turning(
    bolt: Bolt<'_>,
    (head, washer): (&SeatRecord, Option<&SeatRecord>),
    bearing: f64,
) -> Option<f64> {
    let hole = washer
        .and_then(|washer| washer.inner)
        .unwrap_or(bolt.thread.diameter);
    let inner = head.inner.unwrap_or(0.0).max(hole);
    (inner < head.outer && head.outer < bearing).then_some(0.25 * (inner + head.outer))
}

/// An annulus of inner and outer diameter, m, unless nothing of it is left.
fn annulus(bolt: Bolt<'_>, [inner, outer]: [f64; 2], collector: &mut Collector) -> Option<Seat> {
    if inner < outer {
        return Some(Seat {
            inner_radius: inner / 2.0,
            outer_radius: outer / 2.0,
        });
    }
    let key = ["bearing", "hole", "head"]
        .into_iter()
        .find(|key| bolt.record.has(key));
    collector.report(
        fault(
            "fastener/no-seat",
            &bolt.record.span(key.unwrap_or("thread")),
            format!(
                "a seat of {} finds no land around an opening of {}",
                units::show(outer, Quantity::Length),
                units::show(inner, Quantity::Length)
            ),
        )
        .expecting("nothing is left to press on")
        .help("a smaller hole, a larger head, or a washer with `bearing` stated"),
    );
    None
}

fn mean_radius(seat: Seat) -> f64 {
    f64::midpoint(seat.inner_radius, seat.outer_radius)
}
