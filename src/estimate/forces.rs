//! Clamp force of every fastener group: at assembly, in service, and what the bolt bears.

use crate::{
    estimate::{Band, Failure, Realisation},
    joint::{AxialLoad, Bounds, Fastener, FillerKind, Joint, Retightened},
    preload::{
        self, Elasticity, Losses, Place, ServiceLoad, Shared, Stack, Strains, Supports,
        limits::LimitUse,
    },
};

/// Short-term relaxation of an all-metal joint taken in the low force when the file asks for no loss.
///
/// Source: NASA preload practice, 5 %, from memory.
pub const GUIDE_RELAXATION: f64 = 0.05;

/// What a bolt loses while the others are tightened after it: bare or pasted faces, and a soft layer.
///
/// Judgement, for bolts tightened crosswise in several passes: metal on metal loses a few percent; flanges
/// on a soft gasket lose 20 to 40 % in a single pass (from memory).
pub const INTERACTION: [f64; 2] = [0.05, 0.10];

/// What the bolts of one group bear.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strength {
    /// Equivalent stress over yield: nominal and at the highest force.
    pub equivalent: Option<[f64; 2]>,
    /// Largest torque that passes every limit, N m, and the limit that ends it.
    pub largest_torque: Option<(f64, &'static str)>,
    /// Whether every limit holds at the highest force.
    pub passes: bool,
    /// Equivalent stress in service over yield at the worst case, half the torsion left.
    pub in_service: Option<f64>,
}

/// A fastener group in its joint, prepared once.
#[derive(Clone, Debug)]
pub struct Group {
    /// Stack of plates and washers under the bolt.
    pub stack: Stack,
    /// What the plates bear.
    pub supports: Supports,
    /// What gives under the clamp force.
    pub elasticity: Elasticity,
    /// Settling by the guide values, m.
    guide_settling: f64,
    /// Judged loss to the bolts that are tightened after it, as a fraction.
    interaction: f64,
    /// Growth of the stack over the bolt in each case, m.
    growth: Vec<f64>,
}

impl Group {
    /// Prepares a group: resilience, guide settling and the growth of every case.
    pub fn new(joint: &Joint, fastener: &Fastener) -> Result<Self, Failure> {
        let stack = preload::stack(joint, fastener);
        let growth = joint
            .service
            .cases
            .iter()
            .map(|case| match case.name {
                // A plain service temperature does not move the force: only stated hot and cold
                // cases do, so that a joint without them is not burdened by a guess.
                "service" => Ok(0.0),
                _ => growth(joint, fastener, (&stack, case.temperature)),
            })
            .collect::<Result<Vec<f64>, Failure>>()?;
        Ok(Self {
            guide_settling: preload::guide_settling(joint, &stack),
            supports: Supports::in_joint(joint, fastener),
            elasticity: stack.elasticity(),
            interaction: interaction(joint),
            stack,
            growth,
        })
    }

    /// The same group in a joint of other plates; where no temperature moves the force, none does there.
    pub fn anew(&self, joint: &Joint, fastener: &Fastener) -> Result<Self, Failure> {
        let made = Self::new(joint, fastener)?;
        let still = self.growth.iter().all(|growth| *growth == 0.0);
        Ok(if still { made.held() } else { made })
    }

    /// The same where no temperature moves the force any more.
    pub fn held(&self) -> Self {
        Self {
            growth: vec![0.0; self.growth.len()],
            ..self.clone()
        }
    }

    /// What acts on the force of one case at a realisation.
    pub fn losses(&self, joint: &Joint, case: usize, at: &Realisation) -> Losses {
        let growth = self.growth[case];
        let Some(asked) = joint.losses else {
            return Losses {
                settling: at.loss * self.guide_settling,
                relaxation: at.loss * GUIDE_RELAXATION,
                interaction: at.loss * self.interaction,
                growth,
            };
        };
        let long_term = asked.long_term.at(at.long_term);
        // Tightened again, a bolt has lost nothing so far.
        let (settling, short, interaction) = match asked.retightened {
            Retightened::Yes => (0.0, 0.0, 0.0),
            Retightened::No => (
                asked
                    .settling
                    .map_or(self.guide_settling, |settling| settling.at(at.settling)),
                asked.relaxation.at(at.relaxation),
                asked.interaction.unwrap_or(self.interaction),
            ),
        };
        Losses {
            settling,
            relaxation: 1.0 - (1.0 - short) * (1.0 - long_term),
            interaction,
            growth,
        }
    }

    /// What is left of a force at assembly in one case at a realisation, N;
    /// negative where the joint is open before any load from outside.
    pub fn balance(&self, joint: &Joint, (case, at): (usize, &Realisation), assembly: f64) -> f64 {
        self.losses(joint, case, at)
            .balance(assembly, &self.elasticity)
    }

    /// Clamp force of one realisation in service, N, of a bolt by its number in the file or of the lot:
    /// what presses the faces, a lasting load taken off.
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
        let clamp = self.balance(joint, (case, at), assembly).max(0.0);
        let Some(axial) = lasting(fastener) else {
            return clamp;
        };
        let load = ServiceLoad {
            load: Bounds::exact(axial.in_case(joint.service.cases[case].name).at(at.load)),
            introduction: Bounds::exact(axial.introduction.nominal),
        };
        let shared = load.on(&self.elasticity, Bounds::exact(clamp));
        shared.residual.nominal.max(0.0)
    }

    /// Force of the bolt in service before any load from outside, N: nominal, the low corner with the
    /// losses, the high corner.
    pub fn clamp(&self, joint: &Joint, fastener: &Fastener, case: usize) -> Bounds {
        let band = preload::force_band(fastener);
        let after = |force: f64, place: f64| {
            let lossy = Realisation::losing(place);
            self.balance(joint, (case, &lossy), force).max(0.0)
        };
        Bounds::uniform([
            after(band.low, 1.0),
            after(band.nominal, 0.0),
            after(band.high, -1.0),
        ])
    }

    /// What a load from outside does in one case; none where none is stated.
    pub fn shared(&self, joint: &Joint, fastener: &Fastener, case: usize) -> Option<Shared> {
        let axial = fastener.axial_load.as_ref()?;
        let load = ServiceLoad {
            load: axial.in_case(joint.service.cases[case].name),
            introduction: axial.introduction,
        };
        Some(load.on(&self.elasticity, self.clamp(joint, fastener, case)))
    }

    /// Force that presses the faces in service, N: a lasting load taken off.
    pub fn service_band(&self, joint: &Joint, fastener: &Fastener, case: usize) -> Band {
        let clamp = match lasting(fastener).and_then(|_| self.shared(joint, fastener, case)) {
            Some(shared) => shared.residual,
            None => self.clamp(joint, fastener, case),
        };
        Band {
            low: Some(clamp.low.max(0.0)),
            nominal: clamp.nominal.max(0.0),
            high: Some(clamp.high.max(0.0)),
        }
    }

    /// What the bolts bear, at assembly and in every case.
    pub fn strength(&self, joint: &Joint, fastener: &Fastener) -> Strength {
        let in_service = self.in_service(joint, fastener);
        Strength {
            equivalent: preload::strength_use(fastener),
            largest_torque: self.largest_torque(joint, fastener),
            passes: preload::limits(fastener, &self.supports)
                .iter()
                .chain(&in_service)
                .all(|limit| limit.passes),
            in_service: in_service
                .iter()
                .find(|limit| limit.name == preload::limits::IN_SERVICE)
                .map(|limit| limit.used),
        }
    }

    /// The limits of the bolt in service at its worst case: stress with half the torsion, proof load, and
    /// what seats, threads and inserts bear where that is more than at assembly.
    pub fn in_service(&self, joint: &Joint, fastener: &Fastener) -> Vec<LimitUse> {
        let force = self.most_in_service(joint, fastener);
        let more = force > preload::force_band(fastener).high;
        let mut limits = preload::limits_in_service(fastener, &self.supports, force);
        limits.retain(|limit| more || preload::limits::at_assembly(limit.name).is_none());
        limits
    }

    /// Largest force of the bolt in service, N, a load from outside in it.
    pub fn most_in_service(&self, joint: &Joint, fastener: &Fastener) -> f64 {
        let forces = (0..joint.service.cases.len()).map(|case| {
            self.shared(joint, fastener, case).map_or_else(
                || self.clamp(joint, fastener, case).high,
                |shared| shared.bolt_force,
            )
        });
        forces.fold(0.0, f64::max)
    }
}

/// The load of a fastener that acts while the heat is judged.
fn lasting(fastener: &Fastener) -> Option<&AxialLoad> {
    fastener.axial_load.as_ref().filter(|load| load.lasting)
}

/// The judged loss to the bolts that are tightened later: none with a single bolt.
fn interaction(joint: &Joint) -> f64 {
    if joint.bolts().count() < 2 {
        return 0.0;
    }
    INTERACTION[usize::from(on_soft_layer(joint))]
}

/// Whether a layer that yields lies between any two plates.
pub fn on_soft_layer(joint: &Joint) -> bool {
    joint.every_filler().any(|filler| {
        matches!(
            filler.kind,
            FillerKind::Layer { .. } | FillerKind::Table { .. } | FillerKind::Foil { .. }
        )
    })
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

/// What a temperature different from that of assembly makes the stack grow over the bolt, m.
fn growth(
    joint: &Joint,
    fastener: &Fastener,
    (stack, temperature): (&Stack, f64),
) -> Result<f64, Failure> {
    let assembly = joint.service.assembly_temperature;
    let cold = |fault: crate::catalog::ColdFault| Failure::Cold(fault.to_string());
    let strain = |material: &crate::catalog::Material| {
        material
            .contraction_between(assembly, temperature)
            .map_err(cold)
    };
    let bolt = fastener
        .grade
        .contraction_between(assembly, temperature)
        .map_err(cold)?;
    // Plates that the bolt does not clamp need no strain.
    let mut plates = vec![0.0; joint.plates.len()];
    for (plate, _) in &stack.plates {
        plates[*plate] = strain(&joint.plates[*plate].material)?;
    }
    let isolating = match &fastener.isolating {
        Some(washers) => strain(&washers.material)?,
        None => 0.0,
    };
    Ok(stack.growth(&Strains {
        plates: &plates,
        // A washer of the bolt's own material follows the bolt.
        washers: bolt,
        isolating,
        bolt,
    }))
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

    /// Settling of the stack, m.
    fn settled(losses: &str, share: f64) -> f64 {
        let joint = read(&format!("{WASHED}\n{losses}")).expect("the joint is whole");
        let group = Group::new(&joint, &joint.fasteners[0]).expect("nothing is cold");
        // M4 socket screw through 10 mm and two washers: the same stack each time.
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
