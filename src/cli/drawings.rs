//! What the figures show of a joint, gathered from the joint and its results.

mod joint;

pub use joint::plan_and_cut;

use crate::{
    cli::chain::Fields,
    estimate::{Estimate, FieldMap, RingRow},
    figures::{
        CumulativePlot, Curve, DetailKind, Drawing, FacePair, PlanBolt, PlanDetail, PlanMap,
        PlanOutline, PlanPair, PlanShape, RadiusMark, SectionPlot,
    },
    joint::{Joint, Outline, Patch, Plate, Zone},
};

const PRESSURE: &str = "pressure";
const PRESSURE_AND_GAP: &str = "pressure_and_gap";
const CONDUCTANCE: &str = "conductance";
const CUMULATIVE: &str = "cumulative";
const FLUX: &str = "flux";
const TEMPERATURE: &str = "temperature";
const SECTION: &str = "section";

/// Every file name a figure may have, in the order of force and heat.
pub const NAMES: [&str; 7] = [
    PRESSURE,
    PRESSURE_AND_GAP,
    CONDUCTANCE,
    CUMULATIVE,
    FLUX,
    TEMPERATURE,
    SECTION,
];

/// Pressure, local conductance and cumulative conductance, each with its file name; a solved field
/// shows its gap beside the pressure, and what heat does.
pub fn of_joint(joint: &Joint, fields: &Fields) -> Vec<(&'static str, Drawing)> {
    let (nominal, field) = (&fields.nominal, &fields.map);
    let furnish = |map: PlanMap| furnished(map, joint, (nominal, field));
    let title = title(joint, fields.interface);
    let peak = peak(nominal, fields.interface);
    let pressure = if let Some(mut pair) = PlanPair::of(&title, field) {
        pair.pressure.peak = peak;
        let pair = pair.furnished(furnish);
        (PRESSURE_AND_GAP, Drawing::PressureAndGap(Box::new(pair)))
    } else {
        let map = PlanMap {
            peak,
            ..PlanMap::pressure(&title, field)
        };
        (PRESSURE, Drawing::Plan(Box::new(furnish(map))))
    };
    let conductance = Drawing::Plan(Box::new(furnish(PlanMap::conductance(&title, field))));
    let heading = title.clone();
    let cumulative = Drawing::Cumulative(CumulativePlot {
        title,
        curves: curves(&fields.rings),
        marks: marks(joint, nominal),
    });
    let mut drawings = vec![
        pressure,
        (CONDUCTANCE, conductance),
        (CUMULATIVE, cumulative),
    ];
    let heat = joint.service.heat;
    if let Some(map) = &fields.heat {
        let flux = furnish(PlanMap::flux(&heading, (field, map)));
        drawings.push((FLUX, Drawing::Plan(Box::new(flux))));
        let names = joint
            .meeting(fields.interface)
            .map(|plate| plate.name.as_str());
        let faces = FacePair::of(&heading, (field, map), (names, heat)).furnished(furnish);
        drawings.push((TEMPERATURE, Drawing::Faces(Box::new(faces))));
    }
    if let Some(section) = &fields.section {
        let plot = SectionPlot {
            title: joint.title.clone(),
            section: section.clone(),
            heat,
        };
        drawings.push((SECTION, Drawing::Section(Box::new(plot))));
    }
    drawings
}

/// The highest pressure of an interface as its results tell it, Pa: at the columns of the solution,
/// between which a drawing reads.
fn peak(nominal: &Estimate, interface: usize) -> Option<f64> {
    let case = nominal.cases.first()?;
    let peak = match case.interfaces.get(interface) {
        Some(told) => told.peak,
        None => case.pressure.peak,
    };
    Some(peak).filter(|peak| peak.is_finite())
}

/// What a page draws of an interface after the first: where the faces touch, and where heat crosses.
pub fn of_further(joint: &Joint, fields: &Fields) -> Vec<(&'static str, Drawing)> {
    let mut drawings = of_joint(joint, fields);
    drawings.retain(|(name, _)| [PRESSURE, PRESSURE_AND_GAP, FLUX].contains(name));
    drawings
}

/// A map with plates, bolts and heated zones of its joint.
fn furnished(map: PlanMap, joint: &Joint, (nominal, field): (&Estimate, &FieldMap)) -> PlanMap {
    PlanMap {
        outlines: joint.plates.iter().map(outline).collect(),
        bolts: bolts(joint, nominal, field),
        heated: joint
            .source
            .zones()
            .into_iter()
            .filter_map(|(zone, _)| heated(zone))
            .collect(),
        details: joint.plates.iter().flat_map(details).collect(),
        ..map
    }
}

/// The pressure of a joint, for a map beside others.
pub fn pressure(joint: &Joint, nominal: &Estimate, field: &FieldMap) -> PlanMap {
    furnished(
        PlanMap::pressure(&joint.title, field),
        joint,
        (nominal, field),
    )
}

/// What a figure shows, in a sentence, and whether its pictures are maps over the plan.
pub fn told(name: &str) -> (&'static str, bool) {
    match name {
        PRESSURE => ("Contact pressure between the faces.", true),
        PRESSURE_AND_GAP => (
            "Contact pressure, and the gap between the faces where nothing presses.",
            true,
        ),
        CONDUCTANCE => ("Local conductance between the faces.", true),
        FLUX => ("Heat flux between the faces over its mean.", true),
        TEMPERATURE => ("Temperatures of both faces on one scale.", true),
        SECTION => (
            "Temperatures on a cut through the stack, and through its thickness at two places.",
            false,
        ),
        CUMULATIVE => (
            "Conductance gathered from the hole of a bolt outwards.",
            false,
        ),
        _ => ("A figure of the joint.", false),
    }
}

/// The title of the joint; of a stack with the interface that is drawn.
fn title(joint: &Joint, interface: usize) -> String {
    if joint.interfaces() > 1 {
        format!("{}: {}", joint.title, joint.interface_name(interface))
    } else {
        joint.title.clone()
    }
}

pub(super) fn outline(plate: &Plate) -> PlanOutline {
    PlanOutline {
        name: plate.name.clone(),
        shape: match &plate.outline {
            Outline::Rectangle { size } => PlanShape::Rectangle {
                corner: plate.origin,
                size: *size,
            },
            Outline::Disc { radius } => PlanShape::Disc {
                centre: plate.origin,
                radius: *radius,
            },
            Outline::Polygon { points } => PlanShape::Polygon(moved(points, plate.origin)),
        },
    }
}

/// Cut-outs, feet and ribs of a plate.
fn details(plate: &Plate) -> Vec<PlanDetail> {
    let detail = |kind: DetailKind, patch: &Patch| PlanDetail {
        kind,
        shape: shape(patch, plate.origin),
    };
    let cutouts = plate
        .cutouts
        .iter()
        .map(|cutout| detail(DetailKind::CutOut, cutout));
    let feet = plate.feet.iter().flat_map(|feet| &feet.at);
    let feet = feet.map(|foot| detail(DetailKind::Foot, foot));
    let ribs = plate
        .ribs
        .iter()
        .map(|rib| detail(DetailKind::Rib, &rib.patch));
    cutouts.chain(feet).chain(ribs).collect()
}

fn shape(patch: &Patch, [x, y]: [f64; 2]) -> PlanShape {
    match patch {
        Patch::Rectangle { centre, size } => PlanShape::Rectangle {
            corner: [x + centre[0] - size[0] / 2.0, y + centre[1] - size[1] / 2.0],
            size: *size,
        },
        Patch::Disc { centre, radius } => PlanShape::Disc {
            centre: [x + centre[0], y + centre[1]],
            radius: *radius,
        },
        Patch::Polygon { points } => PlanShape::Polygon(moved(points, [x, y])),
    }
}

fn moved(points: &[[f64; 2]], [x, y]: [f64; 2]) -> Vec<[f64; 2]> {
    points
        .iter()
        .map(|point| [x + point[0], y + point[1]])
        .collect()
}

pub(super) fn heated(zone: Zone) -> Option<PlanShape> {
    match zone {
        Zone::Face => None,
        Zone::Rectangle { centre, size } => Some(PlanShape::Rectangle {
            corner: [centre[0] - size[0] / 2.0, centre[1] - size[1] / 2.0],
            size,
        }),
        Zone::Disc { centre, radius } => Some(PlanShape::Disc { centre, radius }),
    }
}

fn bolts(joint: &Joint, nominal: &Estimate, field: &FieldMap) -> Vec<PlanBolt> {
    // A solved field brings its own edge of contact, which is no circle.
    let round = field.gap.is_none();
    let results = nominal.cases.first().map_or(&[][..], |case| &case.bolts);
    joint
        .bolts()
        .enumerate()
        .map(|(index, (group, at))| PlanBolt {
            at,
            hole_radius: group.widest_hole(),
            head_radius: group.head_seat.outer_radius,
            contact_radius: results
                .get(index)
                .filter(|_| round)
                .map(|bolt| bolt.contact_radius),
        })
        .collect()
}

/// Share of a bolt's conductance below which two curves lie on each other in print.
const ONE_LINE: f64 = 0.005;

/// One curve for all bolts whose curves lie on each other.
fn curves(rings: &[Vec<RingRow>]) -> Vec<Curve> {
    let mut groups: Vec<Vec<usize>> = Vec::new();
    for index in 0..rings.len() {
        match groups
            .iter_mut()
            .find(|group| alike(&rings[group[0]], &rings[index]))
        {
            Some(group) => group.push(index),
            None => groups.push(vec![index]),
        }
    }
    groups
        .into_iter()
        .map(|group| {
            let table = telling(&rings[group[0]]);
            let hole = table.first().map(|ring| (ring.radius[0], 0.0));
            Curve {
                label: label(&group, rings.len()),
                points: hole
                    .into_iter()
                    .chain(table.iter().map(|ring| (ring.radius[1], ring.cumulative)))
                    .collect(),
            }
        })
        .collect()
}

/// Share of the total at which the rest of a curve has nothing left to tell.
const TOLD: f64 = 0.995;
/// How far past that place, and past the contact, a curve is drawn, as a factor on the radius.
const PAST: f64 = 1.4;

/// The rings up to a little past the contact and the place where nearly all is gathered.
fn telling(table: &[RingRow]) -> &[RingRow] {
    let total = table.last().map_or(0.0, |ring| ring.cumulative);
    let edge = table
        .iter()
        .take_while(|ring| ring.pressure > 0.0 || ring.cumulative < TOLD * total)
        .last()
        .map_or(f64::INFINITY, |ring| PAST * ring.radius[1]);
    let end = table.partition_point(|ring| ring.radius[1] <= edge);
    &table[..end]
}

/// Whether two curves lie on each other: the same radii in contact, and the same growth.
fn alike(one: &[RingRow], other: &[RingRow]) -> bool {
    let total = one.last().map_or(0.0, |ring| ring.cumulative);
    one.iter().zip(other).all(|(one, other)| {
        one.pressure <= 0.0
            || (one.radius[1] - other.radius[1]).abs() <= ONE_LINE * one.radius[1]
                && (one.cumulative - other.cumulative).abs() <= ONE_LINE * total
    })
}

fn label(group: &[usize], bolts: usize) -> String {
    match group {
        [only] => format!("bolt {}", only + 1),
        _ if group.len() == bolts => "each bolt".to_owned(),
        _ => {
            let numbers: Vec<String> = group.iter().map(|index| (index + 1).to_string()).collect();
            format!("bolts {}", numbers.join(" "))
        }
    }
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
        mark("hole", group.widest_hole()),
        mark("bearing", group.head_seat.outer_radius),
    ];
    let results = nominal.cases.first().map_or(&[][..], |case| &case.bolts);
    if let Some(bolt) = results
        .first()
        .filter(|bolt| bolt.contact_radius.is_finite())
    {
        marks.push(mark("edge of contact", bolt.contact_radius));
    }
    marks
}
