//! Clamp force of every fastener group: at assembly, in service, and what the bolt bears.

use crate::{
    estimate::{Band, Failure, Realisation},
    joint::{Fastener, Joint, Retightened},
    preload::{self, Losses, Place, Stack, Supports, losses::Part},
};

/// Short-term relaxation of an all-metal joint taken in the low force when the file asks for no loss.
///
/// Source: NASA preload practice, 5 %, from memory.
pub const GUIDE_RELAXATION: f64 = 0.05;

/// What the bolts of one group bear.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strength {
    /// Equivalent stress over yield: nominal and at the highest force.
    pub equivalent: Option<[f64; 2]>,
    /// Largest torque that passes every limit, N m, and the limit that ends it.
    pub largest_torque: Option<(f64, &'static str)>,
    /// Whether every limit holds at the highest force.
    pub passes: bool,
}

/// A fastener group in its joint, prepared once.
#[derive(Clone, Debug)]
pub struct Group {
    /// Stack of plates and washers under the bolt.
    pub stack: Stack,
    /// What the plates bear.
    pub supports: Supports,
    /// Settling by the guide values, N.
    guide_settling: f64,
    /// What the temperature of each case adds, N.
    temperature_gain: Vec<f64>,
}

impl Group {
    /// Prepares a group: resilience, guide settling and the gain of every case.
    pub fn new(joint: &Joint, fastener: &Fastener) -> Result<Self, Failure> {
        let stack = preload::stack(joint, fastener);
        let settling = preload::guide_settling(joint, &stack);
        let temperature_gain = joint
            .service
            .cases
            .iter()
            .map(|case| match case.name {
                // A plain service temperature does not move the force: only stated hot and cold
                // cases do, so that a joint without them is not burdened by a guess.
                "service" => Ok(0.0),
                _ => temperature_gain(joint, fastener, (&stack, case.temperature)),
            })
            .collect::<Result<Vec<f64>, Failure>>()?;
        Ok(Self {
            guide_settling: stack.compliance.settling_loss(settling),
            supports: Supports::in_joint(joint, fastener),
            stack,
            temperature_gain,
        })
    }

    /// What acts on the force of one case at a realisation.
    pub fn losses(&self, joint: &Joint, case: usize, at: &Realisation) -> Losses {
        let (settling, relaxation) = match joint.losses {
            Some(asked) => {
                let long_term = asked.long_term.at(at.long_term);
                let (settling, short) = match asked.retightened {
                    Retightened::Yes => (0.0, 0.0),
                    Retightened::No => (
                        asked.settling.map_or(self.guide_settling, |settling| {
                            let settling = settling.at(at.settling);
                            self.stack.compliance.settling_loss(settling)
                        }),
                        asked.relaxation.at(at.relaxation),
                    ),
                };
                (settling, 1.0 - (1.0 - short) * (1.0 - long_term))
            }
            None => (at.loss * self.guide_settling, at.loss * GUIDE_RELAXATION),
        };
        Losses {
            settling,
            relaxation,
            temperature: self.temperature_gain[case],
        }
    }

    /// Force in service of one realisation, N: of a bolt by its number in the file, or of the lot.
    pub fn service_force(
        &self,
        (joint, fastener): (&Joint, &Fastener),
        bolt: Option<usize>,
        (case, at): (usize, &Realisation),
    ) -> f64 {
        let own = joint.bolts_scatter.own;
        let of = |lot: f64| bolt.map_or(lot, |bolt| at.of_bolt(lot, (bolt, own)));
        let place = Place {
            // A bolt's own place counts towards more force, which is less friction.
            friction: -of(-at.friction),
            torque: at.tool,
            preload: of(at.preload),
            running: at.running,
        };
        let assembly = preload::clamp_force(fastener, place);
        preload::force_in_service(assembly, &self.losses(joint, case, at))
    }

    /// Force in service: nominal, the low corner with the losses, the high corner.
    pub fn service_band(&self, joint: &Joint, fastener: &Fastener, case: usize) -> Band {
        let band = preload::force_band(fastener);
        let after = |force: f64, lossy: &Realisation| {
            preload::force_in_service(force, &self.losses(joint, case, lossy))
        };
        Band {
            low: Some(after(band.low, &Realisation::losing(1.0))),
            nominal: after(band.nominal, &Realisation::losing(0.0)),
            high: Some(after(band.high, &Realisation::losing(-1.0))),
        }
    }

    /// What the bolts bear.
    pub fn strength(&self, fastener: &Fastener) -> Strength {
        Strength {
            equivalent: preload::strength_use(fastener),
            largest_torque: preload::largest_torque(fastener, &self.supports),
            passes: preload::limits(fastener, &self.supports)
                .iter()
                .all(|limit| limit.passes),
        }
    }
}

/// Force at assembly as a band: the corners of friction, tool and method, N.
pub fn assembly_band(fastener: &Fastener) -> Band {
    let force = preload::force_band(fastener);
    Band {
        low: Some(force.low),
        nominal: force.nominal,
        high: Some(force.high),
    }
}

/// What a temperature different from that of assembly adds to the force, N.
fn temperature_gain(
    joint: &Joint,
    fastener: &Fastener,
    (stack, temperature): (&Stack, f64),
) -> Result<f64, Failure> {
    let assembly = joint.service.assembly_temperature;
    let cold = |fault: crate::catalog::ColdFault| Failure::Cold(fault.to_string());
    let bolt = fastener
        .grade
        .contraction_between(assembly, temperature)
        .map_err(cold)?;
    let mut parts = Vec::new();
    for (plate, length) in &stack.plates {
        let material = &joint.plates[*plate].material;
        parts.push(Part {
            length: *length,
            strain: material
                .contraction_between(assembly, temperature)
                .map_err(cold)?,
        });
    }
    // A washer of the bolt's own material follows the bolt.
    parts.push(Part {
        length: stack.washers,
        strain: bolt,
    });
    if let Some(washers) = &fastener.isolating {
        parts.push(Part {
            length: stack.isolating,
            strain: washers
                .material
                .contraction_between(assembly, temperature)
                .map_err(cold)?,
        });
    }
    let bolt = Part {
        length: stack.grip,
        strain: bolt,
    };
    Ok(stack.compliance.temperature_gain(&parts, bolt))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::joint::read;

    const WASHED: &str = r#"
        [service]
        medium = "vacuum"
        [[plate]]
        material = "Al 6061-T6"
        thickness = "5 mm"
        size = ["80 mm", "60 mm"]
        finish = "milled"
        [[plate]]
        material = "Al 6061-T6"
        thickness = "5 mm"
        size = ["80 mm", "60 mm"]
        finish = "milled"
        [fastener]
        thread = "M4"
        grade = "8.8"
        head = "socket"
        washer = "ISO 7089"
        nut_washer = "ISO 7089"
        torque = "2 N·m"
        at = ["40 mm", "30 mm"]
        "#;

    /// Force lost by settling, N.
    fn settled(losses: &str, share: f64) -> f64 {
        let joint = read(&format!("{WASHED}\n{losses}")).expect("the joint is whole");
        let group = Group::new(&joint, &joint.fasteners[0]).expect("nothing is cold");
        let at = Realisation {
            loss: share,
            ..Realisation::default()
        };
        group.losses(&joint, 0, &at).settling
    }

    #[test]
    fn guide_settling_is_the_same_asked_for_or_not() {
        let guide = settled("[losses]\nsettling = \"guide\"", 0.0);
        // The same product of the same numbers either way.
        assert!((guide / settled("", 1.0) - 1.0).abs() < 1e-12, "{guide}");
        // Milled is Rz 10 to 40 µm: thread 3, two seats of 3, an interface and two washers of 2 µm.
        let stated = settled("[losses]\nsettling = \"15 µm\"", 0.0);
        assert!((guide / stated - 1.0).abs() < 1e-12, "{guide} {stated}");
    }
}
