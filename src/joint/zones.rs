//! Whether heated and cooled zones lie on metal, and whether a film can take the heat at all.

use crate::{
    joint::{
        CooledPart, Cooling, Joint, Plate, Sink, What, Zone,
        collector::{Collector, Wording, fault},
        record::Record,
        tree::Span,
    },
    units::{self, Quantity},
};

/// Least share of a zone that must be metal (judgement): less is a zone in the wrong place.
const LEAST_METAL: f64 = 0.5;
/// Points along each side of a lattice laid over a zone.
const LATTICE: usize = 48;

/// Checks the zones of a joint against its holes and cut-outs, and its films against absolute zero.
pub(super) fn check(joint: &Joint, file: &Record, collector: &mut Collector) {
    let plates = file.records("plate");
    let (Some(first), Some(last)) = (plates.first(), plates.last()) else {
        return;
    };
    let heated = joint.source.zones().into_iter().map(|(zone, _)| zone);
    let heated = heated.zip(first.records("heated"));
    for (zone, record) in heated {
        on_metal(joint, ("heated", 0), (zone, &record.place), collector);
    }
    if let Cooling::Parts(parts) = &joint.sink {
        let zones = parts.iter().filter_map(|part| match part {
            CooledPart::Film { zone, .. } | CooledPart::Held(zone) => Some(*zone),
            _ => None,
        });
        let zones = zones.filter(|zone| *zone != Zone::Face);
        let cooled = last.records("cooled").iter();
        let cooled = cooled.filter(|record| record.has("size") || record.has("diameter"));
        let index = joint.plates.len() - 1;
        for (zone, record) in zones.zip(cooled) {
            let zone = zone.moved(joint.cold().origin);
            on_metal(joint, ("cooled", index), (zone, &record.place), collector);
        }
    }
    above_zero(joint, last, collector);
}

/// `zone` is in joint coordinates.
fn on_metal(
    joint: &Joint,
    (what, index): (&str, usize),
    (zone, span): (Zone, &Span),
    collector: &mut Collector,
) {
    let plate = &joint.plates[index];
    let holes: Vec<([f64; 2], f64)> = joint
        .bolts()
        .map(|(fastener, at)| (at, fastener.hole_radius[index]))
        .collect();
    // A zone that lies wholly in cut-outs has been told of.
    if metal_share(plate, &[], zone) == Some(0.0) {
        return;
    }
    let Some(share) = metal_share(plate, &holes, zone) else {
        return;
    };
    collector.require(share >= LEAST_METAL, || {
        fault(
            "zone/no-metal",
            span,
            if share > 0.0 {
                format!(
                    "only {:.0} % of the {what} zone is metal of plate `{}`; the rest lies in bolt holes and cut-outs",
                    100.0 * share,
                    plate.name
                )
            } else {
                format!(
                    "the {what} zone lies wholly in bolt holes of plate `{}`",
                    plate.name
                )
            },
        )
        .expecting(format!("expected at least {:.0} % of it on metal", 100.0 * LEAST_METAL))
        .help(
            "`centre` is measured from the lower left corner of the plate (round: from its centre; outline: as its \
             points); heat enters and leaves through metal alone",
        )
    });
}

/// Share of a zone on metal; none for the whole face.
fn metal_share(plate: &Plate, holes: &[([f64; 2], f64)], zone: Zone) -> Option<f64> {
    let (centre, half) = match zone {
        Zone::Face => return None,
        Zone::Rectangle { centre, size } => (centre, size.map(|side| 0.5 * side)),
        Zone::Disc { centre, radius } => (centre, [radius; 2]),
    };
    let near: Vec<&([f64; 2], f64)> = holes
        .iter()
        .filter(|(at, radius)| {
            (0..2).all(|axis| (at[axis] - centre[axis]).abs() < half[axis] + radius)
        })
        .collect();
    let place = |step: usize| 2.0 * (step as f64 + 0.5) / LATTICE as f64 - 1.0;
    let (mut whole, mut metal) = (0_usize, 0_usize);
    for i in 0..LATTICE {
        for j in 0..LATTICE {
            let [x, y] = [place(i), place(j)];
            if matches!(zone, Zone::Disc { .. }) && x.hypot(y) > 1.0 {
                continue;
            }
            let point = [centre[0] + x * half[0], centre[1] + y * half[1]];
            let in_hole = near
                .iter()
                .any(|(at, radius)| (point[0] - at[0]).hypot(point[1] - at[1]) < *radius);
            whole += 1;
            metal += usize::from(plate.covers(point) && !in_hole);
        }
    }
    Some(metal as f64 / whole as f64)
}

/// Films that would need a coolant below absolute zero.
///
/// ```text
/// T_coolant ≤ T_sink − Q/(h A)        h the best of the films, A all of them, holes not taken out
/// ```
fn above_zero(joint: &Joint, last: &Record, collector: &mut Collector) {
    let Some(heat) = joint.service.heat else {
        return;
    };
    let plate = joint.cold();
    let cut: f64 = plate.cutouts.iter().map(crate::joint::Patch::area).sum();
    let face = (plate.outline.area() - cut).max(0.0);
    let films: Option<Vec<(f64, f64)>> = match &joint.sink {
        Cooling::Whole(Sink::Film(coefficient)) => Some(vec![(*coefficient, face)]),
        Cooling::Whole(_) => None,
        Cooling::Parts(parts) => parts
            .iter()
            .map(|part| match part {
                CooledPart::Film { zone, coefficient } => Some((*coefficient, zone.area(face))),
                _ => None,
            })
            .collect(),
    };
    let Some(mut films) = films else { return };
    for (number, (film, _)) in films.iter_mut().enumerate() {
        if let Some(bounds) = joint.spread_of(What::Film(number)) {
            *film = bounds.low;
        }
    }
    let best = films.iter().map(|(film, _)| *film).fold(0.0, f64::max);
    let whole: f64 = films.iter().map(|(_, area)| area).sum();
    let drop = heat / (best * whole);
    let coldest = joint
        .service
        .cases
        .iter()
        .map(|case| case.temperature)
        .fold(f64::INFINITY, f64::min);
    collector.require(drop < coldest, || {
        fault(
            "cooled/below-zero",
            &last.span("cooled"),
            format!(
                "{} through {} of film at {} at most need {:.0} K between sink surface and coolant, and the sink \
                 surface is at {}: the coolant would be below absolute zero",
                units::show(heat, Quantity::Power),
                format_args!("{:.4} m²", whole),
                units::show(best, Quantity::FilmCoefficient),
                drop,
                units::show(coldest, Quantity::Temperature)
            ),
        )
        .expecting("expected a better film, a larger back or less heat")
        .help("the temperature of the service is that of the sink surface; check the unit of `film`")
    });
}
