//! What heat meets in a joint at one realisation: forces, faces, conductivities.

use serde_json::{Value, json};

use crate::{
    conductance::{Curve, Local},
    estimate::{
        Chain, Failure, Realisation,
        chain::{Model, Warmth},
        forces::Group,
        surfaces::{Conducting, Facets},
    },
    joint::{LawLoad, MeasuredKind, Tightening},
    resistance::Load,
};

/// Length of bolt in the head and in the nut through which heat enters and leaves, in diameters.
///
/// Source: the substitution lengths of VDI 2230 for stiffness, 0.5 d and 0.4 d, from memory; heat
/// takes the same shape of path (judgement).
const SHANK_ENDS: f64 = 0.9;

/// What heat meets in a joint: forces, faces, conductivities.
#[derive(Clone, Debug)]
pub struct Conditions {
    /// Clamp force of each bolt in service, N.
    pub forces: Vec<f64>,
    /// The faces of each interface, from warm to cold: local conductance against pressure.
    pub faces: Vec<Faces>,
    /// Mean temperature of the sink surface, K.
    pub temperature: f64,
    /// Conductivity of each plate, W/(m K); in the plane where that through a plate differs.
    pub conductivity: Vec<f64>,
    /// Conductance of each shank, W/K.
    pub shanks: Vec<f64>,
}

impl Conditions {
    /// The same as the networks take it, which know two plates.
    pub fn load(&self) -> Load<'_, impl Fn(f64) -> f64> {
        Load {
            conductance: |pressure: f64| self.faces[0].conductance(pressure),
            conductivity: [
                self.conductivity[0],
                self.conductivity[self.conductivity.len() - 1],
            ],
            forces: &self.forces,
            shanks: &self.shanks,
        }
    }
}

/// The faces of an interface at one realisation.
#[derive(Clone, Debug)]
pub struct Faces {
    /// The laws.
    pub local: Local,
    /// Measured W/K per bolt as conductance over pressure, W/(m² K Pa), where a force law is given.
    pub per_pascal: Option<f64>,
}

impl Faces {
    /// Local conductance at a pressure, W/(m² K); 0 Pa is the open gap.
    pub fn conductance(&self, pressure: f64) -> f64 {
        match self.per_pascal {
            Some(factor) => factor * pressure + self.local.total(0.0),
            None => self.local.total(pressure),
        }
    }

    /// The same faces when nothing presses them: what they conduct without pressure, at any.
    pub(super) fn unpressed(&self) -> Self {
        Self {
            per_pascal: Some(0.0),
            ..self.clone()
        }
    }

    /// The same for many points up to a pressure, from a table of the law where it has no corner.
    pub fn over_many_points(&self, highest_pressure: f64) -> impl Fn(f64) -> f64 {
        let curve = match self.per_pascal {
            Some(_) => None,
            None => Curve::up_to(&self.local, highest_pressure),
        };
        move |pressure| match &curve {
            Some(curve) => curve.total(pressure),
            None => self.conductance(pressure),
        }
    }
}

/// What heat may meet in one case: everything looked up that no draw moves.
#[derive(Clone, Debug)]
pub(super) struct Outlook<'a> {
    chain: &'a Chain<'a>,
    case: usize,
    facets: Vec<Facets>,
    conducting: Vec<Conducting>,
    shanks: Vec<f64>,
    force_law: Option<ForceLaw>,
}

/// A measured law of the conductance of a bolt over its force, at the temperature of a case.
#[derive(Clone, Debug)]
struct ForceLaw {
    /// Conductance of a bolt under its reference force, W/K.
    conductance: f64,
    exponent: f64,
    /// Reference force of every bolt, N.
    references: Vec<f64>,
}

impl ForceLaw {
    /// As a local conductance over pressure, W/(m² K Pa).
    ///
    /// ```text
    /// h = p Σ G(F)/Σ F,   G = G₀ (F/F₀)ⁿ (T/T₀)ᵐ   so that ∫ h dA = Σ G, since ∫ p dA = Σ F
    /// ```
    fn per_pascal(&self, forces: &[f64]) -> f64 {
        let bolts = forces.iter().zip(&self.references);
        let whole: f64 = bolts
            .map(|(force, reference)| self.conductance * (force / reference).powf(self.exponent))
            .sum();
        let carried: f64 = forces.iter().sum();
        if carried > 0.0 { whole / carried } else { 0.0 }
    }
}

impl<'a> Outlook<'a> {
    /// A case with plates of known temperature.
    pub(super) fn of(chain: &'a Chain, case: usize, warmth: &Warmth) -> Result<Self, Failure> {
        let joint = chain.joint();
        let facets = (0..joint.interfaces())
            .map(|index| {
                let facets = Facets::of(joint, (index, warmth.interface(index)))?;
                // Only a solved field knows how a layer is pressed.
                let pressed = joint.filler(index).filter(|_| chain.knows_the_gap());
                Ok(facets.pressed(pressed.and_then(|filler| filler.modulus)))
            })
            .collect::<Result<Vec<Facets>, Failure>>()?;
        let plates = joint.plates.iter().enumerate();
        let conducting = plates
            .map(|(index, plate)| Conducting::of(plate, warmth.plate(index)))
            .collect::<Result<Vec<Conducting>, Failure>>()?;
        Ok(Self {
            chain,
            case,
            facets,
            conducting,
            shanks: chain.shanks(warmth.bolts())?,
            force_law: chain.force_law(case),
        })
    }

    /// What moves with a draw, as data: faces, plates, and the losses of every group at the whole
    /// share of the guide values, as forces of a bolt without springs.
    pub(super) fn tables(&self) -> Value {
        let joint = self.chain.joint();
        let losses = |(_, group): (_, &Group)| {
            let losses = group.losses(joint, self.case, &Realisation::losing(1.0));
            let compliance = group.elasticity.compliance;
            let force = |length: f64| length / (compliance.bolt + compliance.plates);
            json!({
                "settling": force(losses.settling),
                "relaxation": losses.relaxation,
                "interaction": losses.interaction,
                "temperature": force(losses.growth),
            })
        };
        let plates = self.conducting.iter().map(Conducting::table);
        json!({
            "faces": self.facets.iter().map(Facets::table).collect::<Vec<Value>>(),
            "plates": plates.collect::<Vec<Value>>(),
            "losses": self.chain.groups().map(losses).collect::<Vec<Value>>(),
        })
    }

    /// What heat meets at a realisation.
    pub(super) fn at(&self, at: &Realisation) -> Conditions {
        let mut found = Conditions {
            forces: Vec::new(),
            faces: Vec::new(),
            temperature: self.chain.joint().service.cases[self.case].temperature,
            conductivity: Vec::new(),
            shanks: self.shanks.clone(),
        };
        self.put(at, &mut found);
        found
    }

    /// Puts forces, faces and conductivities of a realisation in place of others of this case.
    pub(super) fn put(&self, at: &Realisation, conditions: &mut Conditions) {
        let chain = self.chain;
        let joint = chain.joint();
        let forces = &mut conditions.forces;
        chain.put_service_forces((self.case, at), forces);
        let law = self.force_law.as_ref().map(|law| law.per_pascal(forces));
        conditions.faces.clear();
        conditions.faces.extend(self.facets.iter().map(|facets| {
            let interface = facets.at(joint, at);
            let per_pascal = law.map(|law| law * interface.solid_factor);
            Faces {
                local: interface.into_local(),
                per_pascal,
            }
        }));
        conditions.conductivity.clear();
        let plates = self.conducting.iter().enumerate();
        conditions.conductivity.extend(
            plates.map(|(plate, conducting)| conducting.at(at.conductivity_of(joint, plate))),
        );
    }
}

impl Conditions {
    /// The same without gas in the gaps; none where there is none.
    pub(super) fn without_gas(&self) -> Option<Self> {
        let mut empty = self.clone();
        let mut any = false;
        for faces in &mut empty.faces {
            let mut interface = faces.local.interface().clone();
            any |= interface.gas.take().is_some();
            faces.local = interface.prepare();
        }
        any.then_some(empty)
    }
}

impl Chain<'_> {
    /// Forces, faces and conductivities of one case at one realisation: all that heat meets.
    ///
    /// Properties are those at the mean temperatures of the plates in the nominal state, where these
    /// are solved and the heat is stated; else those at the sink.
    pub(super) fn conditions(&self, case: usize, at: &Realisation) -> Result<Conditions, Failure> {
        match &self.model {
            Model::Cone(_) => self.conditions_at(case, &self.cold(case), at),
            Model::Elastic(model) => self.conditions_at(case, model.warmth(self, case)?, at),
        }
    }

    /// All plates as cold as the sink.
    pub(super) fn cold(&self, case: usize) -> Warmth {
        let joint = self.joint();
        Warmth::uniform(joint.plates.len(), joint.service.cases[case].temperature)
    }

    /// What heat meets in one case at nominal, all plates as cold as the sink; nothing is solved.
    pub fn cold_conditions(&self, case: usize) -> Result<Conditions, Failure> {
        self.conditions_at(case, &self.cold(case), &Realisation::default())
    }

    /// The same with plates of known temperature.
    pub(super) fn conditions_at(
        &self,
        case: usize,
        warmth: &Warmth,
        at: &Realisation,
    ) -> Result<Conditions, Failure> {
        Ok(Outlook::of(self, case, warmth)?.at(at))
    }

    /// Puts the clamp force of every bolt in service at one realisation, N.
    fn put_service_forces(&self, (case, at): (usize, &Realisation), forces: &mut Vec<f64>) {
        let joint = self.joint();
        forces.clear();
        for (fastener, group) in self.groups() {
            let force = |bolt| group.service_force((joint, fastener), bolt, (case, at));
            if at.bolts.is_empty() {
                forces.extend(std::iter::repeat_n(force(None), fastener.places.len()));
            } else {
                let first = forces.len();
                let bolts = first..first + fastener.places.len();
                forces.extend(bolts.map(|bolt| force(Some(bolt))));
            }
        }
        self.vacate(forces);
    }

    /// Measured W/K per bolt at the temperature of a case; none where no such law is stated.
    fn force_law(&self, case: usize) -> Option<ForceLaw> {
        let MeasuredKind::ForceLaw {
            conductance,
            load,
            force_exponent,
            temperature: reference,
            temperature_exponent,
        } = self.joint.measured.as_ref()?.kind
        else {
            return None;
        };
        let temperature = self.joint.service.cases[case].temperature;
        Some(ForceLaw {
            conductance: conductance * (temperature / reference).powf(temperature_exponent),
            exponent: force_exponent,
            references: match load {
                LawLoad::Force(force) => vec![force; self.group_of.len()],
                LawLoad::Torque(torque) => self.forces_at_torque(case, torque),
            },
        })
    }

    /// Force in service of every bolt at nominal, N, times the torque of a measurement over that stated: a
    /// law of wrench torque, in which running torque and losses count alike.
    fn forces_at_torque(&self, case: usize, torque: f64) -> Vec<f64> {
        let nominal = self.nominal_forces(case, self.joint());
        let stated = self.group_of.iter().map(|group| {
            match &self.joint().fasteners[*group].tightening {
                Tightening::Torque(stated) => stated.torque,
                // The reader refuses such a law beside a preload.
                Tightening::Preload(_) => torque,
            }
        });
        nominal
            .iter()
            .zip(stated)
            .map(|(force, stated)| force * torque / stated)
            .collect()
    }

    /// Conductance of each bolt's shank from head to nut, W/K.
    ///
    /// ```text
    /// 1/G = (l_K + 0.9 d)/(k A_s) + n t/(k_w A_w)
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `k`, `A_s` | conductivity of the bolt, stress area | W/(m K), m² | `grade`, `thread` |
    /// | `l_K` | grip, all washers included | m | |
    /// | `d` | nominal diameter | m | `thread` |
    /// | `n t`, `k_w` | height and conductivity of isolating washers | m, W/(m K) | `isolating` |
    /// | `A_w` | annulus under the head | m² | `head_seat` |
    ///
    /// The contacts under head and nut conduct far better than the shank and are left out; those on
    /// isolating washers would isolate more. A bush touches no shank that stands free in its hole.
    /// Checked: `isolating_washers_stand_in_series_with_the_shank`.
    fn shanks(&self, temperature: f64) -> Result<Vec<f64>, Failure> {
        let by_group = self
            .joint
            .fasteners
            .iter()
            .zip(&self.groups)
            .map(|(fastener, group)| {
                if !fastener.shank_path {
                    return Ok(0.0);
                }
                let conductivity = fastener
                    .grade
                    .conductivity_at(temperature)
                    .map_err(|fault| Failure::Cold(fault.to_string()))?;
                let thread = &fastener.thread;
                let length = group.stack.grip + SHANK_ENDS * thread.diameter;
                let mut resistance = length / (conductivity * thread.stress_area);
                if let Some(washers) = &fastener.isolating {
                    let own = washers
                        .material
                        .conductivity_at(temperature)
                        .map_err(|fault| Failure::Cold(fault.to_string()))?;
                    let conducts = own * washers.material.through_ratio();
                    resistance += washers.height() / (conducts * fastener.head_seat.area());
                }
                Ok(resistance.recip())
            })
            .collect::<Result<Vec<f64>, Failure>>()?;
        Ok(self.of_bolts(&by_group))
    }
}
