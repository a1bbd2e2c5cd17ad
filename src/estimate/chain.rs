//! A joint prepared for the chain, and one run through it.

mod conditions;
mod form;
mod geometry;
mod levels;

pub(super) use levels::error_caution;

use std::{borrow::Cow, sync::Arc};

use conditions::Conditions;
use form::with_form;
use geometry::Geometry;
use levels::Level;

use crate::{
    diagnostic::Caution,
    estimate::{
        Band, BoltResult, Failure, PressureResult, Realisation, Strength,
        forces::{self, Group},
    },
    joint::{Bounds, Fastener, Joint, Medium, Tightening},
    pressure::{Cone, Pair},
    resistance::{self, Cells, Path},
};

/// A joint with all that no draw changes worked out.
#[derive(Clone, Debug)]
pub struct Chain<'a> {
    joint: Cow<'a, Joint>,
    groups: Vec<Group>,
    /// Group of each bolt.
    group_of: Vec<usize>,
    /// Shared with the chains of other torques.
    geometry: Arc<Geometry>,
    /// What the plan grid makes of the cells' answer, for each case; none without a grid.
    levels: Vec<Level>,
    /// Model form, as a factor on what the joint adds.
    form: Bounds,
}

/// One run through the chain.
#[derive(Clone, Debug)]
pub struct State {
    /// What heat met.
    pub conditions: Conditions,
    /// Resistances, model form applied.
    pub path: Path,
}

impl<'a> Chain<'a> {
    /// Prepares a joint: resilience, pressure cones, cells.
    pub fn new(joint: &'a Joint) -> Result<Self, Failure> {
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
        Self {
            joint: Cow::Borrowed(joint),
            groups,
            group_of,
            geometry: Arc::new(Geometry::new(joint)?),
            levels: Vec::new(),
            form: Bounds::exact(1.0),
        }
        .levelled(&[])
    }

    /// The chain with calibration and model form for its own forces and medium.
    fn levelled(mut self, others: &[Level]) -> Result<Self, Failure> {
        self.levels = self.levels(others)?;
        self.form = self.form_bounds()?;
        Ok(self)
    }

    /// The same joint with another torque on one group, N m; plates, cells and grid are shared.
    ///
    /// Groups whose preload is stated keep it.
    pub fn with_torque(&self, group: usize, torque: f64) -> Result<Chain<'static>, Failure> {
        self.with(|joint| {
            if let Tightening::Torque(tightening) = &mut joint.fasteners[group].tightening {
                tightening.torque = torque;
            }
        })
    }

    /// The same joint in vacuum; plates, cells and grid are shared.
    pub fn in_vacuum(&self) -> Result<Chain<'static>, Failure> {
        self.with(|joint| joint.service.medium = Medium::Vacuum)
    }

    /// The same plates and places after a change that moves neither.
    fn with(&self, change: impl FnOnce(&mut Joint)) -> Result<Chain<'static>, Failure> {
        let mut joint = self.joint().clone();
        change(&mut joint);
        Chain {
            joint: Cow::Owned(joint),
            groups: self.groups.clone(),
            group_of: self.group_of.clone(),
            geometry: self.geometry.clone(),
            levels: Vec::new(),
            form: Bounds::exact(1.0),
        }
        .levelled(&self.levels)
    }

    /// The joint.
    pub fn joint(&self) -> &Joint {
        &self.joint
    }

    /// The cells of the bolts.
    pub fn cells(&self) -> &Cells {
        &self.geometry.cells
    }

    /// Runs one case through the chain at one realisation.
    pub fn state(&self, case: usize, at: &Realisation) -> Result<State, Failure> {
        let conditions = self.conditions(case, at)?;
        let solved = self.geometry.cells.solve(&conditions.load());
        let path = match self.levels.get(case) {
            Some(level) => level.calibration.applied(solved),
            None => solved,
        };
        let path = with_form(path, self.form.at(at.field));
        self.check(case, &path)?;
        Ok(State { conditions, path })
    }

    fn check(&self, case: usize, path: &Path) -> Result<(), Failure> {
        path.checked("the chain")
            .map_err(|found| self.network(case, found))
    }

    /// A failure of the networks in one case.
    fn network(&self, case: usize, found: resistance::Failure) -> Failure {
        Failure::Network {
            case: self.joint.service.cases[case].name,
            found,
        }
    }

    /// Every bolt of a case, at the nominal state.
    pub fn bolts(&self, case: usize, state: &State) -> Vec<BoltResult> {
        self.joint
            .bolts()
            .enumerate()
            .map(|(bolt, (fastener, at))| {
                let group = &self.groups[self.group_of[bolt]];
                let strength = group.strength(fastener);
                BoltResult {
                    at,
                    force: forces::assembly_band(fastener),
                    force_in_service: group.service_band(self.joint(), fastener, case),
                    strength_use: strength.equivalent,
                    largest_torque: strength.largest_torque.map(|(torque, _)| torque),
                    contact_radius: self.geometry.cones[bolt].contact_radius,
                    contact_conductance: state.path.contact_per_bolt[bolt],
                }
            })
            .collect()
    }

    /// The pressure field of a state.
    pub fn pressure(&self, state: &State) -> PressureResult {
        PressureResult {
            peak: self.geometry.cells.peak_pressure(&state.conditions.forces),
            contact_area: self.geometry.cells.contact_area(),
            radius_95: self
                .geometry
                .cells
                .radius_holding(0.95, &state.conditions.forces),
            force: self.geometry.cells.force_carried(&state.conditions.forces),
            gap_max: None,
            gap_mean: None,
            solved: None,
        }
    }

    /// Area of the faying faces, m².
    pub fn footprint(&self) -> f64 {
        self.geometry.cells.interface_area
    }

    /// Largest torque of a group, N m, and the limit that ends it.
    pub fn largest_torque(&self, group: usize) -> Option<(f64, &'static str)> {
        self.strength(group).largest_torque
    }

    /// What the bolts of a group bear.
    pub fn strength(&self, group: usize) -> Strength {
        self.groups[group].strength(&self.joint.fasteners[group])
    }

    /// Force at assembly of a group.
    pub fn force(&self, group: usize) -> Band {
        forces::assembly_band(&self.joint.fasteners[group])
    }

    /// Fastener groups with their preparation.
    pub(super) fn groups(&self) -> impl Iterator<Item = (&Fastener, &Group)> {
        self.joint.fasteners.iter().zip(&self.groups)
    }

    /// Cautions of the closed-form field that do not depend on the force.
    pub(super) fn field_cautions(&self) -> Vec<Caution> {
        let mut found: Vec<Caution> = Vec::new();
        for caution in self.geometry.pairs.iter().filter_map(Pair::caution) {
            if !found.contains(&caution) {
                found.push(caution);
            }
        }
        found
    }

    /// The cones of the bolts.
    pub fn cones(&self) -> &[Cone] {
        &self.geometry.cones
    }
}
