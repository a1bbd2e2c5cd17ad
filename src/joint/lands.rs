//! Whether holes and seats lie on their plates and apart from each other.

use crate::{
    diagnostic::Fault,
    joint::{
        MOST_PLATES,
        collector::{Collector, Wording, fault},
        patches::Passing,
        plates::PlateDraft,
        tree::Span,
    },
    units::{self, Quantity},
};

/// Touching within this is not yet a fault, m.
const SLACK: f64 = 1e-9;

/// What the bolts of a group need around their places. What is not known is zero.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Land {
    /// Hole radius in each plate, m.
    pub holes: [f64; MOST_PLATES],
    /// Outer radius of the seat on the outer face of each plate, m.
    pub seats: [f64; MOST_PLATES],
    /// What the seat on the plate at the other end is: `nut` or `flange`.
    pub far: &'static str,
    /// Plate on which the head sits.
    pub head_plate: usize,
}

/// The places of a group with what they need.
#[derive(Debug)]
pub(super) struct Site {
    /// What each place needs.
    pub land: Land,
    /// Places in joint coordinates, m, each with the bytes that state it.
    pub places: Vec<([f64; 2], Span)>,
}

/// Every hole and every seat must lie on its plate; one fault for each place is enough.
pub(super) fn fit(site: &Site, plates: &[PlateDraft], collector: &mut Collector) {
    for (point, span) in &site.places {
        if collector.is_full() {
            return;
        }
        let mut faults = plates
            .iter()
            .enumerate()
            .filter_map(|(index, plate)| beyond(site.land, index, *point, plate));
        if let Some(mut told) = faults.next() {
            told.span = span.clone();
            collector.report(told);
        }
    }
}

fn beyond(land: Land, index: usize, point: [f64; 2], plate: &PlateDraft) -> Option<Fault> {
    let (outline, origin) = plate.placed()?;
    let own = [point[0] - origin[0], point[1] - origin[1]];
    let depth = outline.depth(own);
    if depth + SLACK < land.holes[index] {
        return Some(
            fault(
                "plate/hole-outside",
                &(0..0),
                format!(
                    "the hole at {} does not lie inside plate `{}`",
                    shown(point),
                    plate.name
                ),
            )
            .expecting(format!("expected on plate `{}`", plate.name))
            .help(
                "`at` is measured from the lower left corner of the first plate (round: its \
                 centre; outline: as its points)",
            ),
        );
    }
    let seat = land.seats[index];
    let part = if index == land.head_plate {
        "head"
    } else {
        land.far
    };
    if depth + SLACK >= seat {
        let parts = plate.parts.as_ref()?;
        return parts.clash(Passing {
            axis: own,
            hole: land.holes[index],
            part,
            seat,
            place: &shown(point),
            plate: &plate.name,
        });
    }
    Some(
        fault(
            "plate/head-beyond-edge",
            &(0..0),
            format!(
                "the {part} at {} reaches beyond the edge of plate `{}`",
                shown(point),
                plate.name
            ),
        )
        .expecting(format!(
            "expected at least {} from the edge",
            units::show(seat, Quantity::Length)
        )),
    )
}

/// No two holes, heads or nuts may share the same land.
pub(super) fn apart(sites: &[Site], collector: &mut Collector) {
    let mut bolts: Vec<(Land, [f64; 2], &Span)> = sites
        .iter()
        .flat_map(|site| {
            site.places
                .iter()
                .map(|(point, span)| (site.land, *point, span))
        })
        .collect();
    // Along the longer side the neighbours of a bolt stand next to it, so that thousands of bolts
    // are quick.
    let spread = |axis: usize| {
        let along = || bolts.iter().map(|bolt| bolt.1[axis]);
        along().fold(f64::MIN, f64::max) - along().fold(f64::MAX, f64::min)
    };
    let axis = usize::from(spread(1) > spread(0));
    bolts.sort_by(|one, other| one.1[axis].total_cmp(&other.1[axis]));
    let widest = bolts
        .iter()
        .flat_map(|(land, ..)| land.seats.into_iter().chain(land.holes))
        .fold(0.0, f64::max)
        * 2.0;
    for (index, (land, point, span)) in bolts.iter().enumerate() {
        for (other, place, other_span) in &bolts[index + 1..] {
            if place[axis] - point[axis] > widest || collector.is_full() {
                break;
            }
            let distance = (place[0] - point[0]).hypot(place[1] - point[1]);
            let meet = |one: [f64; MOST_PLATES], two: [f64; MOST_PLATES]| {
                (0..MOST_PLATES)
                    .filter(|plate| one[*plate] > 0.0 && two[*plate] > 0.0)
                    .any(|plate| distance + SLACK < one[plate] + two[plate])
            };
            let (code, what) = if meet(land.holes, other.holes) {
                ("plate/holes-overlap", "holes")
            } else if meet(land.seats, other.seats) {
                ("plate/heads-overlap", seats_of([land, other]))
            } else {
                continue;
            };
            let later = if other_span.start >= span.start {
                other_span
            } else {
                span
            };
            collector.report(
                fault(
                    code,
                    later,
                    format!(
                        "the {what} at {} and {} overlap",
                        shown(*point),
                        shown(*place)
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

/// What may overlap of two bolts besides their holes.
fn seats_of(lands: [&Land; 2]) -> &'static str {
    if lands.iter().any(|land| land.far == "flange") {
        "heads or flanges"
    } else {
        "heads or nuts"
    }
}

fn shown(point: [f64; 2]) -> String {
    format!(
        "({}, {})",
        units::show(point[0], Quantity::Length),
        units::show(point[1], Quantity::Length)
    )
}
