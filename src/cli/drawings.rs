//! What the figures show of a joint, gathered from the joint and its results.

use crate::{
    estimate::{Estimate, FieldMap, RingRow},
    figures::{
        CumulativePlot, Curve, Drawing, PlanBolt, PlanMap, PlanOutline, PlanShape, RadiusMark,
    },
    joint::{Joint, Outline, Plate, Zone},
};

/// File names of the figures, in the order of force and heat.
pub const NAMES: [&str; 3] = ["pressure", "conductance", "cumulative"];

/// Pressure, local conductance and cumulative conductance, each with its file name.
pub fn of_joint(
    joint: &Joint,
    nominal: &Estimate,
    (field, rings): (&FieldMap, &[Vec<RingRow>]),
) -> Vec<(&'static str, Drawing)> {
    let on_plan = |map: PlanMap| {
        Drawing::Plan(PlanMap {
            outlines: joint.plates.iter().map(outline).collect(),
            bolts: bolts(joint, nominal),
            heated: heated(joint.source.zone),
            ..map
        })
    };
    let cumulative = Drawing::Cumulative(CumulativePlot {
        title: joint.title.clone(),
        curves: curves(rings),
        marks: marks(joint, nominal),
    });
    NAMES
        .into_iter()
        .zip([
            on_plan(PlanMap::pressure(&joint.title, field)),
            on_plan(PlanMap::conductance(&joint.title, field)),
            cumulative,
        ])
        .collect()
}

fn outline(plate: &Plate) -> PlanOutline {
    PlanOutline {
        name: plate.name.clone(),
        shape: match plate.outline {
            Outline::Rectangle { size } => PlanShape::Rectangle {
                corner: plate.origin,
                size,
            },
            Outline::Disc { radius } => PlanShape::Disc {
                centre: plate.origin,
                radius,
            },
        },
    }
}

fn heated(zone: Zone) -> Option<PlanShape> {
    match zone {
        Zone::Face => None,
        Zone::Rectangle { centre, size } => Some(PlanShape::Rectangle {
            corner: [centre[0] - size[0] / 2.0, centre[1] - size[1] / 2.0],
            size,
        }),
        Zone::Disc { centre, radius } => Some(PlanShape::Disc { centre, radius }),
    }
}

fn bolts(joint: &Joint, nominal: &Estimate) -> Vec<PlanBolt> {
    let results = nominal.cases.first().map_or(&[][..], |case| &case.bolts);
    joint
        .bolts()
        .enumerate()
        .map(|(index, (group, at))| PlanBolt {
            at,
            hole_radius: group.hole_radius[0].max(group.hole_radius[1]),
            head_radius: group.head_seat.outer_radius,
            contact_radius: results.get(index).map(|bolt| bolt.contact_radius),
        })
        .collect()
}

/// One curve for all bolts whose rings are the same.
fn curves(rings: &[Vec<RingRow>]) -> Vec<Curve> {
    let mut groups: Vec<(usize, usize)> = Vec::new();
    for (index, table) in rings.iter().enumerate() {
        match groups
            .iter_mut()
            .find(|(first, _)| like(&rings[*first], table))
        {
            Some((_, count)) => *count += 1,
            None => groups.push((index, 1)),
        }
    }
    groups
        .into_iter()
        .map(|(first, count)| {
            let table = gathered(&rings[first]);
            let hole = table.first().map(|ring| (ring.radius[0], 0.0));
            Curve {
                label: match count {
                    1 => format!("bolt {}", first + 1),
                    _ if count == rings.len() => "each bolt".to_owned(),
                    _ => format!("bolt {} and {} like it", first + 1, count - 1),
                },
                points: hole
                    .into_iter()
                    .chain(table.iter().map(|ring| (ring.radius[1], ring.cumulative)))
                    .collect(),
            }
        })
        .collect()
}

/// Whether two bolts are drawn as one curve: mirror images differ in their last digits.
fn like(one: &[RingRow], other: &[RingRow]) -> bool {
    let near = |one: f64, other: f64| (one - other).abs() <= 1e-6 * one.abs().max(other.abs());
    one.len() == other.len()
        && one.iter().zip(other).all(|(one, other)| {
            near(one.radius[1], other.radius[1]) && near(one.cumulative, other.cumulative)
        })
}

/// The rings up to where nothing more is gathered, and a little of the level part.
fn gathered(table: &[RingRow]) -> &[RingRow] {
    let total = table.last().map_or(0.0, |ring| ring.cumulative);
    let Some(full) = table.iter().find(|ring| ring.cumulative >= 0.999 * total) else {
        return table;
    };
    let end = table.partition_point(|ring| ring.radius[1] <= 1.5 * full.radius[1]);
    &table[..end]
}

/// Radii of the fastener, where all bolts are of one kind.
fn marks(joint: &Joint, nominal: &Estimate) -> Vec<RadiusMark> {
    let [group] = joint.fasteners.as_slice() else {
        return Vec::new();
    };
    let mark = |name: &str, radius: f64| RadiusMark {
        name: name.to_owned(),
        radius,
    };
    let mut marks = vec![
        mark("hole", group.hole_radius[0].max(group.hole_radius[1])),
        mark("bearing", group.head_seat.outer_radius),
    ];
    let results = nominal.cases.first().map_or(&[][..], |case| &case.bolts);
    if let Some(bolt) = results.first() {
        marks.push(mark("edge of contact", bolt.contact_radius));
    }
    marks
}
