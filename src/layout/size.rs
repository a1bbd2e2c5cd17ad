//! A fastener to try in its joint: force, strength, mass, what the faces conduct.

use crate::{
    estimate::{Chain, Choice, Conditions, Fineness, Watch},
    joint::{Fastener, Joint},
    layout::{
        Failure, Sheets, Target,
        bolt::{self, Around, Link},
    },
    pressure::{self, Pair},
};

/// Memory granted to a chain from which nothing is solved; its field is not laid out.
const MEMORY: u64 = 1_000_000_000;

/// A fastener to try, in its joint at places that do not matter.
#[derive(Clone, Debug)]
pub struct Size {
    /// Place in `arrange.sizes`; none for the fastener as stated.
    pub index: Option<usize>,
    /// The joint with it as its first group.
    pub joint: Joint,
    /// The case that is screened.
    pub case: usize,
    /// What heat meets in that case, all plates as cold as the sink.
    pub conditions: Conditions,
    /// Mass of one, kg.
    pub mass: f64,
    /// Why it may not be tightened so; none where it may.
    pub overstressed: Option<String>,
}

impl Size {
    /// Prepares a size from the joint that holds it, for its first case.
    pub fn new(index: Option<usize>, joint: Joint) -> Result<Self, Failure> {
        Self::in_case(index, joint, 0)
    }

    /// The same for one of its cases.
    pub fn in_case(index: Option<usize>, joint: Joint, case: usize) -> Result<Self, Failure> {
        let choice = Choice::elastic(Fineness::Fast, MEMORY);
        let chain = Chain::of(&joint, choice, &Watch::none())?;
        let strength = chain.strength(0);
        let overstressed = (!strength.passes).then(|| {
            let limit = strength.largest_torque.map_or_else(
                || "it bears no torque".to_owned(),
                |(torque, limit)| format!("{limit} ends it at {torque:.3} N·m"),
            );
            format!("{}: {limit}", label(&joint.fasteners[0]))
        });
        let conditions = chain.cold_conditions(case)?;
        Ok(Self {
            index,
            case,
            mass: bolt::mass(&joint, &joint.fasteners[0]),
            conditions,
            overstressed,
            joint,
        })
    }

    /// The fastener.
    pub fn fastener(&self) -> &Fastener {
        &self.joint.fasteners[0]
    }

    /// What people call it: `M5 A2-70`.
    pub fn label(&self) -> String {
        label(self.fastener())
    }

    /// The links of one bolt of some group (0 is arranged) within a radius, one per interface.
    pub(super) fn links(&self, group: usize, radius: f64) -> Vec<Link> {
        let joint = &self.joint;
        let fastener = &joint.fasteners[group];
        let before: usize = joint.fasteners[..group]
            .iter()
            .map(|group| group.places.len())
            .sum();
        let interfaces = joint.interfaces();
        (0..interfaces)
            .map(|interface| {
                let cone = pressure::cone(
                    &pair(joint, fastener, interface),
                    joint.contact.cone,
                    joint.contact.shape,
                );
                let sheets = [interface, interface + 1];
                let conductivity = sheets.map(|plate| self.conditions.conductivity[plate]);
                let thickness = sheets.map(|plate| joint.plates[plate].thickness);
                let around = Around {
                    cone: &cone,
                    force: self.conditions.forces[before],
                    sheet: [0, 1].map(|k| conductivity[k] * thickness[k]),
                    transverse: self.transverse(interface),
                    // In a stack the shank passes every interface in turn.
                    shank: self.conditions.shanks[before] * interfaces as f64,
                };
                let faces = &self.conditions.faces[interface];
                around.within(radius, |pressure| faces.conductance(pressure))
            })
            .collect()
    }

    /// Way through both half plates of an interface, m² K/W.
    pub(super) fn transverse(&self, interface: usize) -> f64 {
        [interface, interface + 1]
            .into_iter()
            .map(|plate| self.across(plate))
            .sum()
    }

    /// Way through one half plate for heat that spreads over it, `t/3k`, m² K/W.
    pub(super) fn across(&self, plate: usize) -> f64 {
        let each = &self.joint.plates[plate];
        let through = self.conditions.conductivity[plate] * each.material.through_ratio();
        each.thickness / (3.0 * through)
    }

    /// Radius where the widest contact of a group ends, m.
    pub(super) fn contact_radius(&self, group: usize) -> f64 {
        let (joint, fastener) = (&self.joint, &self.joint.fasteners[group]);
        (0..joint.interfaces())
            .map(|interface| {
                let pair = pair(joint, fastener, interface);
                pressure::cone(&pair, joint.contact.cone, joint.contact.shape).contact_radius
            })
            .fold(0.0, f64::max)
    }
}

/// The case in which a layout of a joint stands worst by the screening.
pub fn worst_case(
    (joint, places): (&Joint, &[[f64; 2]]),
    target: &Target,
) -> Result<usize, Failure> {
    let count = joint.service.cases.len();
    if count == 1 {
        return Ok(0);
    }
    let ranks = (0..count)
        .map(|case| {
            let sizes = [Size::in_case(None, joint.clone(), case)?];
            let sheets = Sheets::new(&sizes)?;
            let bolts = sheets.influences(places);
            let value = sheets.value(
                &bolts.iter().collect::<Vec<_>>(),
                &sheets.links(&sizes[0]),
                target.measure,
            );
            Ok(target.rank(value))
        })
        .collect::<Result<Vec<f64>, Failure>>()?;
    // The first of equals.
    let worst = (0..count).rev();
    Ok(worst
        .max_by(|one, other| ranks[*one].total_cmp(&ranks[*other]))
        .unwrap_or(0))
}

fn label(fastener: &Fastener) -> String {
    format!("{} {}", fastener.thread.name, fastener.grade.name)
}

/// All plates above an interface and all below it, as the closed form sees two.
fn pair(joint: &Joint, fastener: &Fastener, interface: usize) -> Pair {
    let head = fastener.head_seat.outer_radius;
    let bearing = fastener
        .nut_seat
        .map_or(head, |nut| head.min(nut.outer_radius));
    let (above, below) = joint.plates.split_at(interface + 1);
    let sides = [above, below];
    let thickness = sides.map(|side| side.iter().map(|plate| plate.thickness).sum::<f64>());
    let plane_modulus = [0, 1].map(|k| {
        let weighed = sides[k].iter().map(|plate| {
            let nu = plate.material.poisson.value;
            plate.thickness * plate.material.youngs_modulus.value / (1.0 - nu * nu)
        });
        weighed.sum::<f64>() / thickness[k]
    });
    let hole = fastener.widest_hole();
    Pair {
        hole_radius: hole,
        // A seat no wider than its hole has no ring; a hair of one keeps the law defined.
        bearing_radius: bearing.max(1.02 * hole),
        rim_radius: f64::INFINITY,
        thickness,
        plane_modulus,
    }
}
