//! The clamped stack of a fastener in its joint: grip, compliance, guide settling.

use crate::{
    joint::{Engagement, Fastener, Joint, Outline, Plate},
    preload::{
        losses::{Compliance, Contacts, Working, guide_values, peak_to_valley},
        resilience::{
            BoltShape, Clamped, ConeKind, FarEnd, HeadForm, StackLayer, bolt_compliance,
            stack_compliance,
        },
    },
};

/// Young's modulus of washers, Pa: steel.
const WASHER_MODULUS: f64 = 205e9;

/// What the clamp force of one fastener passes through.
#[derive(Clone, Debug, PartialEq)]
pub struct Stack {
    /// Thickness of each clamped plate with its index, head side first, m.
    pub plates: Vec<(usize, f64)>,
    /// Thickness of all washers, m.
    pub washers: f64,
    /// Grip: plates and washers, m.
    pub grip: f64,
    /// Compliance of bolt and clamped parts, m/N.
    pub compliance: Compliance,
    /// Contacts that settle.
    pub contacts: Contacts,
}

/// The stack of a fastener.
///
/// With a nut every plate is clamped; with a tapped hole or insert only the plates on the head's side of the
/// far one. Taken: thread free over the whole grip, head as long as a hexagon's, washers of steel under the
/// head, an insert as stiff as the plate that holds it, and as outer diameter twice the distance to the nearest
/// plate edge or the distance to the nearest bolt of the group, whichever is smaller. A longer plain shank
/// makes the bolt stiffer and the losses larger.
///
/// Source: VDI 2230-1 by [`bolt_compliance`] and [`stack_compliance`].
/// Checked: `stack_of_a_joint_repeats_example_a`, `tapped_stack_clamps_the_head_plate_alone`.
pub fn stack(joint: &Joint, fastener: &Fastener) -> Stack {
    let order = from_head(joint, fastener);
    let (clamped, far) = match fastener.engagement {
        Engagement::Nut => (&order[..], FarEnd::Nut),
        Engagement::Tapped { .. } | Engagement::Insert { .. } => {
            let (before, last) = order.split_at(order.len() - 1);
            let youngs_modulus = joint.plates[last[0]].material.youngs_modulus.value;
            (before, FarEnd::Tapped { youngs_modulus })
        }
    };
    let plates: Vec<(usize, f64)> = clamped
        .iter()
        .map(|&index| (index, joint.plates[index].thickness))
        .collect();
    let washers = fastener.washer_thickness;
    let grip = washers + plates.iter().map(|(_, thickness)| thickness).sum::<f64>();
    Stack {
        compliance: Compliance {
            bolt: bolt_compliance(&BoltShape {
                thread: &fastener.thread,
                youngs_modulus: fastener.grade.youngs_modulus,
                shank: 0.0,
                free_thread: grip,
                head: HeadForm::Hexagon,
                far,
            })
            .total(),
            plates: plates_compliance(joint, fastener, &plates),
        },
        contacts: contacts(fastener, plates.len()),
        plates,
        washers,
        grip,
    }
}

/// Settling of the whole stack by the guide values, axial, m.
///
/// The class of roughness is that of the roughest face of the joint: Rz taken as 5 Rq.
/// Valid: M4 and larger. Source: VDI 2230-1 guide values, from memory.
pub fn guide_settling(joint: &Joint, stack: &Stack) -> f64 {
    let roughest = joint
        .plates
        .iter()
        .map(|plate| plate.finish.roughness.nominal)
        .fold(0.0, f64::max);
    guide_values(peak_to_valley(roughest), Working::Axial).of_stack(stack.contacts)
}

/// Indices of the plates from the head to the far end.
fn from_head(joint: &Joint, fastener: &Fastener) -> Vec<usize> {
    let indices = 0..joint.plates.len();
    if fastener.head_plate == 0 {
        indices.collect()
    } else {
        indices.rev().collect()
    }
}

fn contacts(fastener: &Fastener, clamped: usize) -> Contacts {
    let washer = u32::from(fastener.washer_thickness > 0.0);
    let plates = clamped as u32;
    match fastener.engagement {
        // Between n clamped plates lie n − 1 interfaces, with a tapped plate behind them n.
        Engagement::Nut => Contacts {
            seats: 2,
            interfaces: plates - 1 + washer,
        },
        Engagement::Tapped { .. } | Engagement::Insert { .. } => Contacts {
            seats: 1,
            interfaces: plates + washer,
        },
    }
}

fn plates_compliance(joint: &Joint, fastener: &Fastener, plates: &[(usize, f64)]) -> f64 {
    let hole = |index: usize| 2.0 * fastener.hole_radius[usize::from(index > 0)];
    let washer = (fastener.washer_thickness > 0.0).then_some(StackLayer {
        thickness: fastener.washer_thickness,
        youngs_modulus: WASHER_MODULUS,
        hole_diameter: 2.0 * fastener.head_seat.inner_radius,
    });
    let layers: Vec<StackLayer> = washer
        .into_iter()
        .chain(plates.iter().map(|&(index, thickness)| StackLayer {
            thickness,
            youngs_modulus: joint.plates[index].material.youngs_modulus.value,
            hole_diameter: hole(index),
        }))
        .collect();
    // A hole as wide as the seat leaves no cone; the reader refuses it, here it must only not divide by zero.
    let widest = layers
        .iter()
        .map(|layer| layer.hole_diameter)
        .fold(0.0, f64::max);
    let seat_diameter = (2.0 * fastener.head_seat.outer_radius).max(1.02 * widest);
    let clamped = Clamped {
        seat_diameter,
        hole_diameter: widest,
        grip: layers.iter().map(|layer| layer.thickness).sum(),
        outer_diameter: land_diameter(joint, fastener).max(seat_diameter),
        kind: match fastener.engagement {
            Engagement::Nut => ConeKind::Through,
            Engagement::Tapped { .. } | Engagement::Insert { .. } => ConeKind::Tapped,
        },
    };
    stack_compliance(&clamped, &layers)
}

/// Diameter of plate that belongs to one bolt, smallest of the group, m.
fn land_diameter(joint: &Joint, fastener: &Fastener) -> f64 {
    let edges = fastener.places.iter().flat_map(|place| {
        joint
            .plates
            .iter()
            .map(move |plate| 2.0 * edge_distance(plate, *place))
    });
    let pitches = fastener
        .places
        .iter()
        .enumerate()
        .flat_map(|(index, place)| {
            fastener.places[index + 1..]
                .iter()
                .map(move |other| (place[0] - other[0]).hypot(place[1] - other[1]))
        });
    edges.chain(pitches).fold(f64::INFINITY, f64::min)
}

/// Distance of a place from the nearest edge of a plate, m; negative outside.
fn edge_distance(plate: &Plate, place: [f64; 2]) -> f64 {
    let [x, y] = [place[0] - plate.origin[0], place[1] - plate.origin[1]];
    match plate.outline {
        Outline::Rectangle { size } => x.min(size[0] - x).min(y).min(size[1] - y),
        Outline::Disc { radius } => radius - x.hypot(y),
    }
}
