//! A joint prepared for the chain, and one run through it.

mod changed;
mod conditions;
mod cone;
mod draw;
mod elastic;
mod form;
mod geometry;
mod levels;
mod remade;
mod temperatures;
mod warmth;

pub use draw::{Bend, DrawPlan, Drawn, Workspace};
pub(crate) use levels::LARGE_ERROR;
pub(in crate::estimate) use warmth::Warmth;

use std::{
    borrow::Cow,
    sync::{Arc, OnceLock},
};

use changed::with_torque;
pub use conditions::Conditions;
use cone::ConeModel;
use elastic::ElasticModel;
use form::with_error;

use crate::{
    diagnostic::Caution,
    estimate::{
        Band, BoltResult, Choice, Failure, Fineness, InterfaceResult, PressureResult, Realisation,
        RingRow, Side, Strength, TorqueLimit, Watch,
        forces::{self, Group},
        torques::SEPARATION,
    },
    joint::{Fastener, Joint},
    pressure::Cone,
    resistance::{self, Cells, Path},
};

/// A joint with all that no draw changes worked out.
#[derive(Clone, Debug)]
pub struct Chain<'a> {
    joint: Cow<'a, Joint>,
    groups: Vec<Group>,
    /// Group of each bolt.
    group_of: Vec<usize>,
    model: Model,
    /// Error of the discretisation, where it has been worked out; shared with other torques and media.
    error: Arc<OnceLock<f64>>,
}

/// What stands for the pressure between the faces and for the heat in the plates.
#[derive(Clone, Debug)]
enum Model {
    /// Closed form and networks.
    Cone(ConeModel),
    /// Elastic contact and conduction of the whole plates.
    Elastic(Box<ElasticModel>),
}

/// One run through the chain.
#[derive(Clone, Debug)]
pub struct State {
    /// What heat met.
    pub conditions: Conditions,
    /// Resistances, model form applied.
    pub path: Path,
}

/// An end of the clamp force in service.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ForceEnd {
    /// Highest friction, weakest tool, all losses.
    Least,
    /// Lowest friction, strongest tool, no loss.
    Largest,
}

/// How the faces meet at a point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Meeting {
    /// Contact pressure, Pa.
    pub pressure: f64,
    /// Gap beside the contact, m; none where the field knows none.
    pub gap: Option<f64>,
}

/// Contact at an edge.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct PressedEdge {
    /// Place in joint coordinates, m.
    pub(super) at: [f64; 2],
    /// Highest pressure along the edges, Pa.
    pub(super) pressure: f64,
}

impl<'a> Chain<'a> {
    /// Prepares a joint: resilience, pressure cones, cells.
    pub fn new(joint: &'a Joint) -> Result<Self, Failure> {
        Self::of(joint, Choice::Cone, &Watch::none())
    }

    /// Prepares a joint on the field of choice; an elastic field is solved here.
    pub fn of(joint: &'a Joint, choice: Choice, watch: &Watch) -> Result<Self, Failure> {
        let groups = joint
            .fasteners
            .iter()
            .map(|fastener| Group::new(joint, fastener))
            .collect::<Result<Vec<Group>, Failure>>()?;
        let group_of: Vec<usize> = joint
            .fasteners
            .iter()
            .enumerate()
            .flat_map(|(index, fastener)| fastener.places.iter().map(move |_| index))
            .collect();
        let mut chain = Self {
            joint: Cow::Borrowed(joint),
            error: Arc::default(),
            groups,
            group_of,
            model: match choice {
                Choice::Cone => Model::Cone(ConeModel::new(joint)?),
                Choice::Elastic { fineness, memory } => Model::Elastic(Box::new(
                    ElasticModel::new(joint, (fineness, memory), watch)?,
                )),
            },
        };
        chain.model = chain.levelled()?;
        Ok(chain)
    }

    /// The model brought to the forces and the medium of this chain.
    fn levelled(&self) -> Result<Model, Failure> {
        Ok(match &self.model {
            Model::Cone(model) => Model::Cone(model.levelled(self)?),
            Model::Elastic(model) => Model::Elastic(Box::new(model.levelled(self))),
        })
    }

    /// The field as users name it.
    pub fn field_name(&self) -> &'static str {
        match &self.model {
            Model::Cone(_) => "cone",
            Model::Elastic(_) => "elastic",
        }
    }

    /// How finely it is solved, as users name it.
    pub fn resolution_name(&self) -> &'static str {
        match &self.model {
            Model::Cone(_) => Fineness::Normal.name(),
            Model::Elastic(model) => model.fineness().name(),
        }
    }

    /// The joint.
    pub fn joint(&self) -> &Joint {
        &self.joint
    }

    /// The cells of the bolts; the closed-form field alone has them.
    pub fn cells(&self) -> Option<&Cells> {
        match &self.model {
            Model::Cone(model) => Some(model.cells()),
            Model::Elastic(_) => None,
        }
    }

    /// Runs one case through the chain at one realisation.
    pub fn state(&self, case: usize, at: &Realisation) -> Result<State, Failure> {
        let conditions = self.conditions(case, at)?;
        let path = match &self.model {
            Model::Cone(model) => model.path(self, case, (&conditions, at))?,
            Model::Elastic(model) => model.path(self, case, (&conditions, at))?,
        };
        let path = with_error(path, at.numerical);
        self.check(case, &path)?;
        Ok(State { conditions, path })
    }

    fn check(&self, case: usize, path: &Path) -> Result<(), Failure> {
        path.checked("the chain")
            .map_err(|found| self.network(case, found))
    }

    /// Largest error of the surface from which the draws of a case are read, relative to source to
    /// sink; none where every draw is solved or none was made.
    pub fn draw_error(&self, case: usize) -> Option<f64> {
        match &self.model {
            Model::Cone(model) => model.draw_error(case),
            Model::Elastic(model) => model.draw_error(case),
        }
    }

    /// Least and largest force in service of all bolts together over a force, N, in one case.
    pub(super) fn force_range(&self, case: usize, over: f64) -> [f64; 2] {
        self.force_ends(case)
            .map(|forces| forces.iter().sum::<f64>() / over)
    }

    /// Works out what the draws of a case need, once; to be called before draws run side by side.
    pub fn expect_draws(&self, case: usize) -> Result<(), Failure> {
        match &self.model {
            Model::Cone(model) => model.expect_draws(self, case),
            Model::Elastic(model) => model.expect_draws(self, case),
        }
    }

    /// Makes ready for many torques of one group, from the least to the largest, in one case.
    ///
    /// The field of bent faces is tabulated; everything else needs no preparation.
    pub fn expect_torques(
        &self,
        (case, group): (usize, usize),
        torques: [f64; 2],
    ) -> Result<(), Failure> {
        match &self.model {
            Model::Cone(_) => Ok(()),
            Model::Elastic(model) => {
                let own: f64 = self.nominal_forces(case, self.joint()).iter().sum();
                let factors = torques.map(|torque| {
                    let changed = with_torque(self.joint(), group, torque);
                    self.nominal_forces(case, &changed).iter().sum::<f64>() / own
                });
                model.tabulate(self, (case, factors))
            }
        }
    }

    /// Clamp force of every bolt in service at nominal, for a joint of these groups, N.
    pub(super) fn nominal_forces(&self, case: usize, joint: &Joint) -> Vec<f64> {
        let at = Realisation::default();
        let by_group: Vec<f64> = joint
            .fasteners
            .iter()
            .zip(&self.groups)
            .map(|(fastener, group)| group.service_force((joint, fastener), None, (case, &at)))
            .collect();
        self.of_bolts(&by_group)
    }

    /// Values of the groups bolt by bolt; nothing where a bolt is missing.
    pub(super) fn of_bolts(&self, by_group: &[f64]) -> Vec<f64> {
        let mut found: Vec<f64> = self.group_of.iter().map(|group| by_group[*group]).collect();
        self.vacate(&mut found);
        found
    }

    /// Leaves nothing of the values of missing bolts.
    pub(super) fn vacate(&self, values: &mut [f64]) {
        for bolt in &self.joint.missing {
            values[*bolt] = 0.0;
        }
    }

    /// A failure of the networks in one case.
    pub(super) fn network(&self, case: usize, found: resistance::Failure) -> Failure {
        Failure::Network {
            case: self.joint.service.cases[case].name,
            found,
        }
    }

    /// Refuses a case in which a bolt no longer clamps.
    pub(super) fn refuse_open(&self, case: usize, forces: &[f64]) -> Result<(), Failure> {
        if self.open_bolts(forces) > 0 {
            return Err(self.open(case, forces));
        }
        Ok(())
    }

    /// Number of bolts that are there and no longer clamp.
    fn open_bolts(&self, forces: &[f64]) -> usize {
        let bolts = forces.iter().enumerate();
        bolts
            .filter(|(bolt, force)| **force <= 0.0 && !self.joint.is_missing(*bolt))
            .count()
    }

    /// The failure of a case in which bolts no longer clamp.
    pub(super) fn open(&self, case: usize, forces: &[f64]) -> Failure {
        Failure::Open {
            bolts: self.open_bolts(forces),
            of: self.joint().clamping(),
            case: self.joint().service.cases[case].name,
        }
    }

    /// Least and largest force in service of every bolt in one case, N.
    pub(super) fn force_ends(&self, case: usize) -> [Vec<f64>; 2] {
        let bands: Vec<Band> = self
            .joint
            .fasteners
            .iter()
            .zip(&self.groups)
            .map(|(fastener, group)| group.service_band(self.joint(), fastener, case))
            .collect();
        let ends = |of: &dyn Fn(&Band) -> f64| -> Vec<f64> {
            let by_group: Vec<f64> = bands.iter().map(of).collect();
            self.of_bolts(&by_group)
        };
        [
            ends(&|band| band.low.unwrap_or(band.nominal).min(band.nominal)),
            ends(&|band| band.high.unwrap_or(band.nominal).max(band.nominal)),
        ]
    }

    /// Every bolt of a case, at the nominal state.
    pub fn bolts(&self, case: usize, state: &State) -> Vec<BoltResult> {
        let strengths: Vec<Strength> = self
            .groups()
            .map(|(fastener, group)| group.strength(self.joint(), fastener))
            .collect();
        self.joint
            .bolts()
            .enumerate()
            .map(|(bolt, (fastener, at))| {
                if self.joint.is_missing(bolt) {
                    return BoltResult::missing(at);
                }
                let group = &self.groups[self.group_of[bolt]];
                let strength = &strengths[self.group_of[bolt]];
                BoltResult {
                    at,
                    missing: false,
                    force: forces::assembly_band(fastener),
                    force_in_service: group.service_band(self.joint(), fastener, case),
                    axial: group.shared(self.joint(), fastener, case),
                    strength_use: strength.equivalent,
                    use_in_service: strength.in_service,
                    largest_torque: strength.largest_torque.map(|(torque, _)| torque),
                    contact_radius: match &self.model {
                        Model::Cone(model) => model.contact_radius(bolt),
                        Model::Elastic(model) => model.contact_radius(self, (case, bolt)),
                    },
                    contact_conductance: state.path.contact_per_bolt[bolt],
                }
            })
            .collect()
    }

    /// The pressure field of a state.
    pub fn pressure(&self, case: usize, state: &State) -> Result<PressureResult, Failure> {
        match &self.model {
            Model::Cone(model) => Ok(model.pressure(&state.conditions.forces)),
            Model::Elastic(model) => model.pressure(self, case),
        }
    }

    /// Every interface of a state, from warm to cold.
    pub fn interfaces(
        &self,
        case: usize,
        (state, pressure): (&State, &PressureResult),
    ) -> Result<Vec<InterfaceResult>, Failure> {
        match &self.model {
            Model::Cone(_) => Ok(vec![InterfaceResult::only(
                self.joint(),
                &state.path,
                pressure,
            )]),
            Model::Elastic(model) => model.interfaces(self, case),
        }
    }

    /// Whether the field knows the gap beside the contact.
    pub fn knows_the_gap(&self) -> bool {
        match &self.model {
            Model::Cone(_) => false,
            Model::Elastic(_) => true,
        }
    }

    /// How the faces of the first interface meet at a point in joint coordinates, first case at nominal;
    /// none off the faying faces or in a hole.
    pub fn met_at(&self, point: [f64; 2], state: &State) -> Option<Meeting> {
        self.met_in(0, point, state)
    }

    /// The same in any interface, counted from the warm side; the cone has one.
    pub fn met_in(&self, interface: usize, point: [f64; 2], state: &State) -> Option<Meeting> {
        match &self.model {
            Model::Cone(model) => {
                let forces = model.clamping(&state.conditions.forces);
                let pressure = model.cells().pressure_at(point, &forces)?;
                Some(Meeting {
                    pressure,
                    gap: None,
                })
            }
            Model::Elastic(model) => model.met_at(self, (point, interface)),
        }
    }

    /// The rings around every bolt, in file order and from the hole outward, in an interface counted
    /// from the warm side; the cone has one.
    pub fn rings(&self, interface: usize, state: &State) -> Vec<Vec<RingRow>> {
        match &self.model {
            Model::Cone(model) => (0..state.conditions.forces.len())
                .map(|bolt| model.rings(&state.conditions, bolt))
                .collect(),
            Model::Elastic(model) => model.rings(self, interface),
        }
    }

    /// Area of the faying faces, m².
    pub fn footprint(&self) -> f64 {
        match &self.model {
            Model::Cone(model) => model.cells().interface_area,
            Model::Elastic(model) => model.footprint(self),
        }
    }

    /// Largest torque of a group, N m, and the limit that ends it.
    pub fn largest_torque(&self, group: usize) -> Option<(f64, &'static str)> {
        self.strength(group).largest_torque
    }

    /// What the bolts of a group bear.
    pub fn strength(&self, group: usize) -> Strength {
        self.groups[group].strength(&self.joint, &self.joint.fasteners[group])
    }

    /// Every limit of strength and separation on the torque of a group, torque rising.
    pub fn torque_limits(&self, group: usize) -> Vec<TorqueLimit> {
        let (prepared, fastener) = (&self.groups[group], &self.joint.fasteners[group]);
        let least = prepared.least_torque(&self.joint, fastener);
        let least = least.map(|torque| TorqueLimit {
            name: SEPARATION,
            torque,
            side: Side::Least,
        });
        let most = prepared.most_torques(&self.joint, fastener);
        let most = most.into_iter().map(|(name, torque)| TorqueLimit {
            name,
            torque,
            side: Side::Most,
        });
        let mut limits: Vec<TorqueLimit> = least.into_iter().chain(most).collect();
        limits.sort_by(|one, other| one.torque.total_cmp(&other.torque));
        limits
    }

    /// Force at assembly of a group.
    pub fn force(&self, group: usize) -> Band {
        forces::assembly_band(&self.joint.fasteners[group])
    }

    /// Fastener groups with their preparation.
    pub(super) fn groups(&self) -> impl Iterator<Item = (&Fastener, &Group)> {
        self.joint.fasteners.iter().zip(&self.groups)
    }

    /// Where the contact of a case reaches an edge of plate or foot; the closed-form field is cut
    /// there and knows nothing of it.
    pub(super) fn pressed_edge(&self, case: usize) -> Option<PressedEdge> {
        match &self.model {
            Model::Cone(_) => None,
            Model::Elastic(model) => model.pressed_edge(self, case),
        }
    }

    /// Cautions of the closed-form field that do not depend on the force.
    pub(super) fn field_cautions(&self) -> Vec<Caution> {
        match &self.model {
            Model::Cone(model) => model.cautions(),
            Model::Elastic(_) => Vec::new(),
        }
    }

    /// The cones of the bolts; the closed-form field alone has them.
    pub fn cones(&self) -> &[Cone] {
        match &self.model {
            Model::Cone(model) => model.cones(),
            Model::Elastic(_) => &[],
        }
    }

    /// Error of the discretisation at the nominal state of the first case, relative to source to
    /// sink.
    pub fn discretisation_error(&self, state: &State) -> Result<f64, Failure> {
        if let Some(error) = self.known_error() {
            return Ok(error);
        }
        let error = match &self.model {
            Model::Cone(model) => model.discretisation_error(self, state),
            Model::Elastic(model) => model.discretisation_error(self),
        }?;
        Ok(*self.error.get_or_init(|| error))
    }

    /// The same where this chain, or the one it comes from, has worked it out.
    pub(crate) fn known_error(&self) -> Option<f64> {
        self.error.get().copied()
    }

    /// Bolts whose forces move together in the draws: every group, or every bolt for itself.
    pub(super) fn force_classes(&self) -> Vec<Vec<usize>> {
        let bolts = 0..self.group_of.len();
        if self.joint.bolts_scatter.own > 0.0 {
            return bolts.map(|bolt| vec![bolt]).collect();
        }
        let mut classes = vec![Vec::new(); self.groups.len()];
        for bolt in bolts {
            classes[self.group_of[bolt]].push(bolt);
        }
        classes
    }

    /// Share of what the gas takes off the joint's resistance: 0 in vacuum, near 1 where the gas
    /// carries nearly all.
    pub(in crate::estimate) fn gas_share(&self) -> Result<f64, Failure> {
        match &self.model {
            Model::Cone(model) => model.gas_share(self),
            Model::Elastic(model) => model.gas_share(self),
        }
    }
}
