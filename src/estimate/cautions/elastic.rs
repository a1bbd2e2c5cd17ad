//! Cautions of a solved pressure field: what stays open, what yields, where it presses an edge.

use crate::{
    diagnostic::Caution,
    estimate::{
        CaseResult, Chain, Flatness,
        cautions::{caution, feet},
        group_label,
    },
    joint::{Filler, FillerKind, Joint, Plate},
};

/// Closure of a layer, as a share of its thickness, beyond which a bed of springs says little
/// (judgement; pads are rated to a third or a half).
const SQUEEZED: f64 = 0.5;

/// What a solved field says of a joint, the cases as they come.
pub(super) fn cautions(chain: &Chain, cases: &[CaseResult]) -> Vec<Caution> {
    let joint = chain.joint();
    // All cases have the flatness of the first.
    let mut found: Vec<Caution> = cases.first().and_then(stays_open).into_iter().collect();
    for (index, case) in cases.iter().enumerate() {
        found.extend(limits(joint, case));
        // A layer gives way at an edge, where hard faces cut into each other.
        if let Some(edge) = chain.pressed_edge(index).filter(|_| !yields(joint)) {
            found.push(caution(
                "pressure/contact-at-edge",
                format!(
                    "{} case: contact reaches an edge, most at ({:.1}, {:.1}) mm with {:.1} MPa; chamfer, burr and grid \
                     decide the pressure there",
                    case.name,
                    edge.at[0] * 1e3,
                    edge.at[1] * 1e3,
                    edge.pressure * 1e-6
                ),
            ));
        }
    }
    found.extend(seats_yield(chain));
    for (fastener, _) in chain.groups() {
        found.extend(feet::head_off_foot(joint, fastener));
    }
    found.extend(joint.every_filler().filter_map(rigid_filler));
    found
}

/// Whether layers spread the pressure in all interfaces.
fn yields(joint: &Joint) -> bool {
    (0..joint.interfaces()).all(|interface| {
        joint
            .filler(interface)
            .and_then(Filler::stiffness)
            .is_some()
    })
}

/// Faces that the bolts do not close.
fn stays_open(case: &CaseResult) -> Option<Caution> {
    let flatness = &case.pressure.solved.as_ref()?.flatness;
    if flatness.closes() != Some(false) {
        return None;
    }
    let text = match *flatness {
        Flatness::Flat => return None,
        Flatness::Known {
            initial,
            left,
            flat,
        } => format!(
            "faces that stand up to {:.1} µm apart unbolted keep a gap of {:.1} µm under the bolts, where flat \
             ones would have {:.1} µm; the gap is in these numbers",
            initial * 1e6,
            left * 1e6,
            flat * 1e6
        ),
        Flatness::Stated { height, left, flat } => format!(
            "faces flat within {:.0} µm keep a gap of up to {:.1} µm if convex and {:.1} µm if concave, where \
             flat ones would have {:.1} µm; nominal is flat, and a band holds for each way",
            height * 1e6,
            left[0] * 1e6,
            left[1] * 1e6,
            flat * 1e6
        ),
    };
    Some(caution("pressure/flatness-stays-open", text))
}

/// Contact pressure beyond the yield of a plate, or beyond what a layer can be squeezed.
fn limits(joint: &Joint, case: &CaseResult) -> Vec<Caution> {
    let interfaces = case.interfaces.iter().enumerate();
    interfaces
        .flat_map(|(interface, told)| limits_of((joint, interface), case.name, told.peak))
        .collect()
}

fn limits_of((joint, interface): (&Joint, usize), case: &str, peak: f64) -> Vec<Caution> {
    let mut found = Vec::new();
    let softest = softest(joint.meeting(interface));
    if let Some((name, strength)) = softest.filter(|(_, strength)| peak > *strength) {
        found.push(caution(
            LIMITS,
            format!(
                "{} case: the faces press up to {:.0} MPa on {name}, which yields at {:.0} MPa: the elastic field no \
                 longer holds there",
                case,
                peak * 1e-6,
                strength * 1e-6
            ),
        ));
    }
    let layer = joint.filler(interface);
    if let Some((filler, modulus)) = layer.and_then(|filler| Some((filler, filler.modulus?)))
        && peak > SQUEEZED * modulus
    {
        found.push(caution(
            "pressure/layer-squeezed",
            format!(
                "{} case: {} would be squeezed by {:.0} % of its thickness at {:.2} MPa: a real layer stiffens, flows or \
                 needs stops long before, and the load spreads less than told",
                case,
                filler.name,
                100.0 * peak / modulus,
                peak * 1e-6
            ),
        ));
    }
    found
}

const LIMITS: &str = "pressure/elastic-limits";

/// The plate that yields first, with its yield strength, Pa.
fn softest(plates: [&Plate; 2]) -> Option<(&str, f64)> {
    let strengths = plates.into_iter().filter_map(|plate| {
        let strength = plate.material.yield_strength.as_ref()?.value;
        Some((plate.name.as_str(), strength))
    });
    strengths.min_by(|one, other| one.1.total_cmp(&other.1))
}

/// Heads and nuts that press a plate beyond its yield at the nominal force of assembly.
fn seats_yield(chain: &Chain) -> Vec<Caution> {
    let joint = chain.joint();
    let mut found = Vec::new();
    for (index, (fastener, _)) in chain.groups().enumerate() {
        let force = chain.force(index).nominal;
        let head_plate = fastener.head_plate;
        let far = joint.plates.len() - 1 - head_plate;
        let seats = [
            ("head", Some(fastener.head_seat), head_plate),
            ("nut", fastener.nut_seat, far),
        ];
        for (what, seat, plate) in seats {
            let plate = &joint.plates[plate];
            let (Some(seat), Some(strength)) = (seat, &plate.material.yield_strength) else {
                continue;
            };
            let area = std::f64::consts::PI
                * (seat.outer_radius * seat.outer_radius - seat.inner_radius * seat.inner_radius);
            if force / area > strength.value {
                found.push(caution(
                    LIMITS,
                    format!(
                        "{}: the {what} presses {:.0} MPa on {}, which yields at {:.0} MPa: the elastic field no longer \
                         holds there",
                        group_label(fastener),
                        force / area * 1e-6,
                        plate.name,
                        strength.value * 1e-6
                    ),
                ));
            }
        }
    }
    found
}

/// A layer that conducts but does not spread the pressure, for want of its modulus.
fn rigid_filler(filler: &Filler) -> Option<Caution> {
    let layer = match filler.kind {
        FillerKind::Layer { .. } | FillerKind::Foil { .. } | FillerKind::Table { .. } => true,
        FillerKind::Fluid { .. } | FillerKind::Paste { .. } => false,
    };
    (layer && filler.stiffness().is_none()).then(|| {
        caution(
            "pressure/filler-rigid",
            format!(
                "{} conducts as a layer, but its modulus is not known: the plates press as if they met bare, so there \
                 is more pressure told at the bolts and less between them",
                filler.name
            ),
        )
    })
}
