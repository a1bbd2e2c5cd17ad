//! The joint itself for a drawing: plan, cut along a row of bolts, what is written beside it.

use crate::{
    cli::drawings::{details, heated, outline},
    estimate::{OutlinePlate, StackOutline, stack_outline},
    figures::{CutBolt, CutEnd, CutHead, JointCut, JointPlot, PlanBolt, PlanMap},
    joint::{Engagement, Fastener, Joint, Plate},
    report::number::brief,
};

/// Plan and cut of a joint; nothing is solved for it.
pub fn plan_and_cut(joint: &Joint) -> JointPlot {
    let bounds = joint.plates.iter().map(Plate::bounds);
    let window = bounds.reduce(|one, other| {
        [
            one[0].min(other[0]),
            one[1].min(other[1]),
            one[2].max(other[2]),
            one[3].max(other[3]),
        ]
    });
    let plan = PlanMap {
        outlines: joint.plates.iter().map(outline).collect(),
        details: joint.plates.iter().flat_map(details).collect(),
        bolts: joint
            .bolts()
            .map(|(group, at)| PlanBolt {
                at,
                hole_radius: group.widest_hole(),
                head_radius: group.head_seat.outer_radius,
                contact_radius: None,
            })
            .collect(),
        heated: joint
            .source
            .zones()
            .into_iter()
            .filter_map(|(zone, _)| heated(zone))
            .collect(),
        ..PlanMap::without_field(&joint.title, window.unwrap_or([0.0; 4]))
    };
    JointPlot {
        told: told(joint),
        plan,
        cut: stack_outline(joint).map(|stack| cut(joint, stack)),
    }
}

/// Plates and fasteners in a line.
fn told(joint: &Joint) -> String {
    let groups = joint.fasteners.iter().map(|group| {
        format!(
            "{} × {} {}",
            group.places.len(),
            group.thread.name,
            group.grade.name
        )
    });
    format!(
        "{} plates, {}",
        joint.plates.len(),
        groups.collect::<Vec<String>>().join(", ")
    )
}

fn cut(joint: &Joint, stack: StackOutline) -> JointCut {
    let all: Vec<(&Fastener, [f64; 2])> = joint.bolts().collect();
    let bolts = stack.bolts.iter().filter_map(|bolt| {
        let (group, at) = all.get(bolt.number - 1)?;
        let there = !joint.missing.contains(&(bolt.number - 1));
        let faces = faces(joint, (*at, &stack.plates))?;
        there.then(|| cut_bolt(joint, group, (bolt.along, faces, &stack.plates)))
    });
    JointCut {
        bolts: bolts.collect(),
        labels: joint
            .plates
            .iter()
            .map(|plate| {
                format!(
                    "{}: {}, {} mm",
                    plate.name,
                    plate.material.name,
                    brief(plate.thickness * 1e3)
                )
            })
            .collect(),
        stack,
    }
}

/// Heights of the outer faces of the stack at a bolt, lower and upper, m: on a rib where it stands on
/// one.
fn faces(joint: &Joint, (at, plates): ([f64; 2], &[OutlinePlate])) -> Option<[f64; 2]> {
    let feet = |plate: &Plate| plate.feet.as_ref().map_or(0.0, |feet| feet.height);
    let solid = |plate: &Plate| feet(plate) + plate.thickness_at(at);
    let (warm, cold) = (joint.warm(), joint.cold());
    Some([
        plates.last()?.heights[1] - solid(cold),
        plates.first()?.heights[0] + solid(warm),
    ])
}

fn cut_bolt(
    joint: &Joint,
    group: &Fastener,
    (along, faces, plates): (f64, [f64; 2], &[OutlinePlate]),
) -> CutBolt {
    let far = plates
        .get(joint.far_plate(group))
        .map(|plate| plate.heights);
    // From the face under the head to the faying face of the far plate.
    let grip = far.map_or(0.0, |[low, high]| {
        if group.head_plate == 0 {
            faces[1] - high
        } else {
            low - faces[0]
        }
    });
    CutBolt {
        along,
        diameter: group.thread.diameter,
        seat_radius: group.head_seat.outer_radius,
        washers: group.washer_thickness,
        faces,
        head_on_top: group.head_plate == 0,
        head: match (group.conical_seat, group.cylindrical_head) {
            (true, _) => CutHead::Countersunk,
            (false, true) => CutHead::Cylinder,
            (false, false) => CutHead::Hexagon,
        },
        end: match group.engagement {
            Engagement::Nut => CutEnd::Nut {
                washer: group.washers > 1,
            },
            Engagement::Tapped { length } | Engagement::Insert { length } => {
                CutEnd::Thread(grip + length)
            }
        },
    }
}
