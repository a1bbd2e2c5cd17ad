//! Cautions of the pressure field: edges, neighbours, flatness, seats.

use crate::{
    catalog,
    diagnostic::Caution,
    estimate::{
        CaseResult, Chain,
        cautions::{caution, elastic},
        group_label,
    },
    joint::{Engagement, Fastener, FillerKind, Joint, Medium, Zone},
    resistance::Cells,
};

/// Nearest neighbours farther apart than this many thicknesses of the thinner plate let it part
/// and spread poorly between them (judgement).
const WIDE_PITCH: f64 = 12.0;

pub(super) fn field_cautions(chain: &Chain, cases: &[CaseResult]) -> Vec<Caution> {
    let joint = chain.joint();
    let mut found = match chain.cells() {
        Some(cells) => {
            let mut found = cone_cautions(chain, cells);
            found.extend(small_source(joint));
            found
        }
        None => elastic::cautions(chain, cases),
    };
    let thinnest = joint
        .plates
        .iter()
        .map(|plate| plate.thickness)
        .fold(f64::INFINITY, f64::min);
    if let Some(pitch) = widest_pitch(joint).filter(|pitch| *pitch > WIDE_PITCH * thinnest) {
        let feet = joint.plates.iter().any(|plate| plate.feet.is_some());
        let what = match cases.first().and_then(|case| case.pressure.gap_max) {
            // The widest gap is then the height of the feet, which says nothing of the plates.
            Some(_) if feet => {
                "between them only feet touch, and heat must travel along the plates; the solved field has both".to_owned()
            }
            // A bow opens faces too; what is told is true of any cause.
            Some(gap) => format!(
                "the plates stand up to {:.3} µm apart, and heat must travel along them; the solved field has both",
                gap * 1e6
            ),
            None => "between them the plates part, and heat must travel along them".to_owned(),
        };
        found.push(caution(
            "pressure/thin-plate-wide-pitch",
            format!(
                "bolts stand up to {:.0} mm apart on a {:.2} mm plate: {what}",
                pitch * 1e3,
                thinnest * 1e3
            ),
        ));
    }
    for (fastener, _) in chain.groups() {
        found.extend(seat_cautions(fastener));
    }
    found
}

/// What the closed form does not know of this joint.
fn cone_cautions(chain: &Chain, cells: &Cells) -> Vec<Caution> {
    let joint = chain.joint();
    let mut found = chain.field_cautions();
    let cut = cells.cut_share.iter().copied().fold(0.0, f64::max);
    if cut > 0.0 {
        found.push(caution(
            "pressure/cone-beyond-edge",
            format!(
                "up to {:.1} % of a bolt's closed-form field fell beyond an edge or into a hole; the rest was raised \
                 to carry the whole force",
                100.0 * cut
            ),
        ));
    }
    if cells.overlaps.iter().any(|overlaps| *overlaps) {
        found.push(caution(
            "pressure/overlap",
            "contact zones of neighbouring bolts overlap and their pressures are added; the cone knows no other \
             influence between bolts",
        ));
    }
    if flatness_decides(joint) {
        found.push(caution(
            FLATNESS_DECIDES,
            format!(
                "{}: more than the cone may pass over; these numbers stand for flat faces, and no requirement counts \
                 as met on them",
                flatness_stated(joint).unwrap_or_default()
            ),
        ));
    } else if let Some(stated) = flatness_stated(joint) {
        found.push(caution(
            "pressure/flatness-ignored",
            format!("{stated}; the cone takes both faces as flat, so neither gap nor lost contact is in these numbers"),
        ));
    }
    let gas = matches!(joint.service.medium, Medium::Gas { .. });
    if joint.filler(0).is_none() && gas && chain.gas_share().is_ok_and(|share| share > GAS_MATTERS)
    {
        found.push(caution(
            GAP_IGNORED,
            "between the bolts the cone keeps the faces at the distance of their roughness; really the plates part by \
             some µm there, in proportion to the force, and the gas resists more (on two joints solved in full the \
             joint added 1.4 and 1.8 times as much): go by the upper end of the band",
        ));
    }
    if joint.is_layered(0) {
        found.push(caution(
            "pressure/filler-spreads",
            "the pressure is that of bare plates; a layer between them spreads the load, so that there is less pressure \
             at the bolts and some between them",
        ));
    }
    for (fastener, _) in chain.groups() {
        found.extend(cone_seat_cautions(fastener));
    }
    found
}

/// Seats as the closed form stands for them.
fn cone_seat_cautions(fastener: &Fastener) -> Vec<Caution> {
    let name = group_label(fastener);
    let mut found = Vec::new();
    match (fastener.engagement, fastener.nut_seat) {
        (Engagement::Nut, Some(nut)) => {
            let head = fastener.head_seat.outer_radius;
            if (nut.outer_radius / head - 1.0).abs() > 0.02 {
                found.push(caution(
                    "pressure/unequal-seats",
                    format!(
                        "{name}: head and nut press on unequal seats ({:.2} and {:.2} mm across); the cone takes the \
                         smaller for both",
                        2e3 * head,
                        2e3 * nut.outer_radius
                    ),
                ));
            }
        }
        (Engagement::Tapped { .. } | Engagement::Insert { .. }, _) => found.push(caution(
            "pressure/tapped-cone",
            format!(
                "{name}: the cone stands for a head on both faces; a thread in the far plate pulls nearer to the \
                 interface (reference joints: 4 to 5 % more resistance in vacuum, which the upper end of the band allows for)"
            ),
        )),
        (Engagement::Nut, None) => {}
    }
    found
}

fn seat_cautions(fastener: &Fastener) -> Vec<Caution> {
    let name = group_label(fastener);
    let mut found = Vec::new();
    if fastener.conical_seat {
        found.push(caution(
            "pressure/conical-seat",
            format!("{name}: a countersunk head presses a cone, not the flat annulus of the pressure law"),
        ));
    }
    if let Some(hole) = catalog::clearance_hole(&fastener.thread.name) {
        let widest = fastener.widest_hole();
        if 2.0 * widest > hole.diameters[2] * 1.001 {
            found.push(caution(
                "pressure/large-hole",
                format!(
                    "{name}: a {:.2} mm hole is wider than the coarse clearance hole of {:.2} mm ({})",
                    2e3 * widest,
                    hole.diameters[2] * 1e3,
                    hole.standard
                ),
            ));
        }
    }
    found
}

/// Sources narrower than this many thicknesses of the warm plate read high.
const SMALL_SOURCE: f64 = 3.0;

/// The plan grid takes the flux under a source as even through the plate, which a small source is not.
fn small_source(joint: &Joint) -> Option<Caution> {
    let width = match joint.source.alone()?.zone {
        Zone::Face => return None,
        Zone::Rectangle { size, .. } => size[0].min(size[1]),
        Zone::Disc { radius, .. } => 2.0 * radius,
    };
    let thickness = joint.warm().thickness;
    (width < SMALL_SOURCE * thickness).then(|| {
        caution(
            "resistance/small-source",
            format!(
                "the heated zone is {:.1} thicknesses of its plate wide: source to sink and perfect contact read high \
                 (14 % at 2, 30 % at 0.8, 75 % at 0.4 thicknesses); what the joint adds is less touched",
                width / thickness
            ),
        )
    })
}

/// Share of what the gas takes off the joint's resistance from which it is worth a word.
pub(in crate::estimate) const GAS_MATTERS: f64 = 0.05;
/// Code of the caution that the gap between the bolts is missing in a gas.
pub(in crate::estimate) const GAP_IGNORED: &str = "pressure/gap-ignored";
/// Code of the caution that out-of-flatness decides the result.
pub(in crate::estimate) const FLATNESS_DECIDES: &str = "pressure/flatness-decides";
/// Out-of-flatness of both faces together from which the cone's flat faces mean little, m; the
/// bolts of the reference joints opened their plates by 4 to 8 µm, a bow of 30 µm changed them by
/// 1 to 3 % (judgement).
const LARGE: f64 = 2e-4;
/// The same as a share of the thickness of a filler (judgement).
const LARGE_SHARE: f64 = 0.5;

/// Whether stated bow and flatness are too large for a field of flat faces.
fn flatness_decides(joint: &Joint) -> bool {
    let total: f64 = joint
        .plates
        .iter()
        .map(|plate| plate.bow.map_or(plate.flatness.unwrap_or(0.0), f64::abs))
        .sum();
    let layer = joint.filler(0).and_then(|filler| match filler.kind {
        FillerKind::Layer { thickness, .. } | FillerKind::Foil { thickness, .. } => Some(thickness),
        FillerKind::Paste { applied, .. } => Some(applied),
        FillerKind::Fluid { .. } | FillerKind::Table { .. } => None,
    });
    total > layer.map_or(LARGE, |layer| LARGE_SHARE * layer)
}

/// What the file says of out-of-flatness, in words; none when it says nothing.
fn flatness_stated(joint: &Joint) -> Option<String> {
    let stated: Vec<String> = joint
        .plates
        .iter()
        .filter_map(|plate| match (plate.bow, plate.flatness) {
            (Some(bow), _) if bow != 0.0 => Some(format!(
                "{} is {} by {:.0} µm",
                plate.name,
                if bow > 0.0 { "concave" } else { "convex" },
                bow.abs() * 1e6
            )),
            (_, Some(flatness)) if flatness > 0.0 => Some(format!(
                "{} is flat within {:.0} µm",
                plate.name,
                flatness * 1e6
            )),
            _ => None,
        })
        .collect();
    (!stated.is_empty()).then(|| stated.join(", "))
}

/// Largest distance from a bolt to its nearest neighbour, m.
fn widest_pitch(joint: &Joint) -> Option<f64> {
    let bolts = joint.bolts().enumerate();
    let places: Vec<[f64; 2]> = bolts
        .filter(|(bolt, _)| !joint.is_missing(*bolt))
        .map(|(_, (_, place))| place)
        .collect();
    places
        .iter()
        .enumerate()
        .filter_map(|(index, place)| {
            places
                .iter()
                .enumerate()
                .filter(|(other, _)| *other != index)
                .map(|(_, other)| (place[0] - other[0]).hypot(place[1] - other[1]))
                .reduce(f64::min)
        })
        .reduce(f64::max)
}
