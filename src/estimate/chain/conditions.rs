//! What heat meets in a joint at one realisation: forces, faces, conductivities.

use crate::{
    conductance::{Curve, Local},
    estimate::{
        Chain, Failure, Realisation,
        chain::{Model, Warmth},
        surfaces,
    },
    joint::MeasuredKind,
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

    /// The same with plates of known temperature.
    pub(super) fn conditions_at(
        &self,
        case: usize,
        warmth: &Warmth,
        at: &Realisation,
    ) -> Result<Conditions, Failure> {
        let joint = self.joint();
        let by_group: Vec<f64> = joint
            .fasteners
            .iter()
            .zip(&self.groups)
            .map(|(fastener, group)| group.service_force(joint, fastener, (case, at)))
            .collect();
        let forces = self.of_bolts(&by_group);
        let temperature = joint.service.cases[case].temperature;
        let law = self.force_law(&forces, temperature);
        let faces = (0..joint.interfaces())
            .map(|index| {
                let place = (index, warmth.interface(index));
                let mut interface = surfaces::interface(joint, place, at)?;
                if self.knows_the_gap() {
                    // Only a solved field knows how a layer is pressed.
                    interface.filler_modulus =
                        joint.filler(index).and_then(|filler| filler.modulus);
                }
                Ok(Faces {
                    local: interface.prepare(),
                    per_pascal: law.map(|law| law * interface.solid_factor),
                })
            })
            .collect::<Result<Vec<Faces>, Failure>>()?;
        Ok(Conditions {
            forces,
            faces,
            temperature,
            conductivity: surfaces::conductivities(joint, warmth, at)?,
            shanks: self.shanks(warmth.bolts())?,
        })
    }

    /// Measured W/K per bolt as a local conductance over pressure, W/(m² K Pa).
    ///
    /// ```text
    /// h = p Σ G(F)/Σ F,   G = G₀ (F/F₀)ⁿ (T/T₀)ᵐ   so that ∫ h dA = Σ G, since ∫ p dA = Σ F
    /// ```
    fn force_law(&self, forces: &[f64], temperature: f64) -> Option<f64> {
        let MeasuredKind::ForceLaw {
            conductance,
            force,
            force_exponent,
            temperature: reference,
            temperature_exponent,
        } = self.joint.measured.as_ref()?.kind
        else {
            return None;
        };
        let warmth = (temperature / reference).powf(temperature_exponent);
        let whole: f64 = forces
            .iter()
            .map(|each| conductance * (each / force).powf(force_exponent) * warmth)
            .sum();
        let carried: f64 = forces.iter().sum();
        Some(if carried > 0.0 { whole / carried } else { 0.0 })
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
