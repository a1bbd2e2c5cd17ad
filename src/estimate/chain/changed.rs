//! The same joint otherwise: another torque, bolt, medium or force, or fewer bolts.

use std::{
    borrow::Cow,
    sync::{Arc, OnceLock},
};

use crate::{
    estimate::{
        Chain, Failure, Fineness,
        chain::{ForceEnd, Model, cone::ConeModel},
        forces::Group,
    },
    joint::{Bounds, Fastener, Joint, Medium, Tightening},
};

impl Chain<'_> {
    /// The same joint with another torque on one group, N m; plates, cells and grid are shared.
    ///
    /// Groups whose preload is stated keep it.
    pub fn with_torque(&self, group: usize, torque: f64) -> Result<Chain<'static>, Failure> {
        let changed = with_torque(self.joint(), group, torque);
        if changed == *self.joint() {
            // What is solved of this chain is solved of that one.
            return Ok(Chain {
                joint: Cow::Owned(changed),
                groups: self.groups.clone(),
                group_of: self.group_of.clone(),
                model: self.model.clone(),
                error: self.error.clone(),
            });
        }
        self.with(changed)
    }

    /// The same joint on a field of another fineness, which knows what this chain knows of contact and
    /// plates; what either learns later stays its own.
    ///
    /// With [`Chain::expect_contact`] before, no contact that both need is solved twice. The answers are
    /// those of a chain of its own.
    /// Checked: `a_chain_from_another_fineness_answers_as_its_own`.
    pub fn at_fineness(&self, fineness: Fineness) -> Result<Chain<'static>, Failure> {
        let model = match &self.model {
            Model::Cone(_) => self.model.clone(),
            Model::Elastic(model) => {
                Model::Elastic(Box::new(model.at_fineness(self.joint(), fineness)?))
            }
        };
        let joint = self.joint().clone();
        self.changed(joint, (self.groups.clone(), model), Arc::default())
    }

    /// Solves the contact that a field of another, coarser fineness needs at nominal; it is a step on the
    /// way to that of this chain.
    pub fn expect_contact(&self, fineness: Fineness) -> Result<(), Failure> {
        match &self.model {
            Model::Cone(_) => Ok(()),
            Model::Elastic(model) => model.expect_contact(self, fineness),
        }
    }

    /// The same joint with every bolt at its least or its largest force in service of one case;
    /// plates and contact are shared.
    ///
    /// Checked: `force_ends_are_those_of_the_band`.
    pub fn at_force_end(&self, case: usize, end: ForceEnd) -> Result<Chain<'static>, Failure> {
        let mut joint = self.joint().clone();
        // The ends hold every loss and every load already.
        joint.losses = None;
        for (fastener, group) in joint.fasteners.iter_mut().zip(&self.groups) {
            let band = group.service_band(self.joint(), fastener, case);
            let force = match end {
                ForceEnd::Least => band.low,
                ForceEnd::Largest => band.high,
            };
            fastener.tightening = Tightening::Preload(Bounds::exact(force.unwrap_or(band.nominal)));
            fastener.axial_load = None;
        }
        let held = self.groups.iter().map(Group::held).collect();
        self.changed(joint, (held, self.model.clone()), self.error.clone())
    }

    /// Lets go of solved fields that draws no longer need, so that many chains fit into memory; what
    /// is asked for again is solved again.
    pub fn forget_fields(&self) {
        if let Model::Elastic(model) = &self.model {
            model.forget_fields();
        }
    }

    /// The same joint with a group tightened or graded otherwise; plates, cells and grid are shared, so
    /// that places, holes and seats must be the same.
    pub(crate) fn with_fastener(
        &self,
        group: usize,
        fastener: Fastener,
    ) -> Result<Chain<'static>, Failure> {
        let mut joint = self.joint().clone();
        joint.fasteners[group] = fastener;
        let mut groups = self.groups.clone();
        groups[group] = Group::new(&joint, &joint.fasteners[group])?;
        self.changed(joint, (groups, self.model.clone()), self.error.clone())
    }

    /// The same joint in vacuum; plates, cells and grid are shared.
    pub fn in_vacuum(&self) -> Result<Chain<'static>, Failure> {
        self.in_medium(Medium::Vacuum)
    }

    /// The same joint in another medium; plates, cells, grid and contact are shared.
    pub fn in_medium(&self, medium: Medium) -> Result<Chain<'static>, Failure> {
        let mut joint = self.joint().clone();
        joint.service.medium = medium;
        self.with(joint)
    }

    /// The same joint without some bolts, by their numbers from 1; on a solved field grid and plates
    /// are shared.
    pub fn without(&self, numbers: &[usize]) -> Result<Chain<'static>, Failure> {
        let joint = self.joint().without(numbers)?;
        let model = match &self.model {
            Model::Cone(_) => Model::Cone(ConeModel::new(&joint)?),
            Model::Elastic(model) => Model::Elastic(Box::new(model.afresh())),
        };
        self.changed(joint, (self.groups.clone(), model), Arc::default())
    }

    /// The joint whose file states other values in place of some spreads, by their numbers, SI; the contact
    /// is shared where none of them moves it.
    pub(super) fn remade(&self, values: &[(usize, f64)]) -> Result<Chain<'static>, Failure> {
        let joint = self.joint().remade(values);
        let bolted = joint.fasteners.iter().zip(&self.groups);
        let groups = bolted
            .map(|(fastener, group)| group.anew(&joint, fastener))
            .collect::<Result<Vec<Group>, Failure>>()?;
        let model = match &self.model {
            Model::Cone(_) => Model::Cone(ConeModel::new(&joint)?),
            Model::Elastic(model) => {
                let stated = &self.joint().uncertain;
                let moved = |(index, _): &(usize, f64)| stated[*index].what.moves_contact();
                let same = !values.iter().any(moved);
                Model::Elastic(Box::new(model.remade(&joint, same)?))
            }
        };
        self.changed(joint, (groups, model), Arc::default())
    }

    /// The same plates and places in another joint.
    fn with(&self, joint: Joint) -> Result<Chain<'static>, Failure> {
        let same = (self.groups.clone(), self.model.clone());
        self.changed(joint, same, self.error.clone())
    }

    /// A joint with the places of this one.
    fn changed(
        &self,
        joint: Joint,
        (groups, model): (Vec<Group>, Model),
        error: Arc<OnceLock<f64>>,
    ) -> Result<Chain<'static>, Failure> {
        let mut chain = Chain {
            joint: Cow::Owned(joint),
            groups,
            group_of: self.group_of.clone(),
            model,
            error,
        };
        chain.model = chain.levelled()?;
        Ok(chain)
    }
}

/// A joint with another torque on one group; a stated preload stays.
pub(super) fn with_torque(joint: &Joint, group: usize, torque: f64) -> Joint {
    let mut changed = joint.clone();
    if let Tightening::Torque(tightening) = &mut changed.fasteners[group].tightening {
        tightening.torque = torque;
    }
    changed
}
