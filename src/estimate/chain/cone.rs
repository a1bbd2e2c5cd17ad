//! The chain on closed forms and networks: cones, ring sums, plan grid.

use std::{borrow::Cow, sync::Arc};

use crate::{
    diagnostic::Caution,
    estimate::{
        Chain, Failure, PressureResult, Realisation, RingRow,
        chain::{conditions::Conditions, form::with_form, geometry::Geometry, levels::Level},
    },
    joint::{Bounds, Joint},
    pressure::{Cone, Pair},
    resistance::{Cells, Path},
};

/// The closed-form field on networks.
#[derive(Clone, Debug)]
pub(super) struct ConeModel {
    /// Shared with the chains of other torques.
    pub(super) geometry: Arc<Geometry>,
    /// What the plan grid makes of the cells' answer, for each case; none without a grid.
    levels: Vec<Level>,
    /// Model form, as a factor on what the joint adds.
    form: Bounds,
}

impl ConeModel {
    pub(super) fn new(joint: &Joint) -> Result<Self, Failure> {
        Ok(Self {
            geometry: Arc::new(Geometry::new(joint)?),
            levels: Vec::new(),
            form: Bounds::exact(1.0),
        })
    }

    /// The same plates with calibration and model form for the forces and the medium of a chain.
    pub(super) fn levelled(&self, chain: &Chain) -> Result<Self, Failure> {
        Ok(Self {
            levels: self.calibrated(chain, &self.levels)?,
            form: self.form_bounds(chain)?,
            geometry: self.geometry.clone(),
        })
    }

    pub(super) fn cells(&self) -> &Cells {
        &self.geometry.cells
    }

    pub(super) fn cones(&self) -> &[Cone] {
        &self.geometry.cones
    }

    /// The path of a case at one realisation, model form applied.
    pub(super) fn path(&self, case: usize, conditions: &Conditions, at: &Realisation) -> Path {
        let solved = self.cells().solve(&self.clamped(conditions).load());
        let mut path = match self.levels.get(case) {
            Some(level) => level.calibration.applied(solved),
            None => solved,
        };
        if !self.all_clamp(conditions) {
            let known = std::mem::take(&mut path.contact_per_bolt);
            path.contact_per_bolt = vec![0.0; conditions.forces.len()];
            for (bolt, contact) in self.geometry.clamping.iter().zip(known) {
                path.contact_per_bolt[*bolt] = contact;
            }
        }
        with_form(path, self.form.at(at.field))
    }

    fn all_clamp(&self, conditions: &Conditions) -> bool {
        self.geometry.clamping.len() == conditions.forces.len()
    }

    /// Conditions as the networks take them: those of the bolts that are there.
    pub(super) fn clamped<'a>(&self, conditions: &'a Conditions) -> Cow<'a, Conditions> {
        if self.all_clamp(conditions) {
            return Cow::Borrowed(conditions);
        }
        Cow::Owned(Conditions {
            forces: self.clamping(&conditions.forces),
            shanks: self.clamping(&conditions.shanks),
            ..conditions.clone()
        })
    }

    /// Values of the bolts that are there, of the values of all.
    pub(super) fn clamping(&self, values: &[f64]) -> Vec<f64> {
        let clamping = self.geometry.clamping.iter();
        clamping.map(|bolt| values[*bolt]).collect()
    }

    /// Place among the bolts that are there; none for one that is missing.
    fn place(&self, bolt: usize) -> Option<usize> {
        self.geometry.clamping.binary_search(&bolt).ok()
    }

    /// Radius where the contact of a bolt ends, m; 0 where the bolt is missing.
    pub(super) fn contact_radius(&self, bolt: usize) -> f64 {
        self.place(bolt)
            .map_or(0.0, |place| self.cones()[place].contact_radius)
    }

    /// The rings around a bolt; none where it is missing.
    pub(super) fn rings(&self, conditions: &Conditions, bolt: usize) -> Vec<RingRow> {
        let clamped = self.clamped(conditions);
        self.place(bolt)
            .map_or_else(Vec::new, |place| self.cells().rings(&clamped.load(), place))
    }

    /// The pressure field under the forces of the bolts, N.
    pub(super) fn pressure(&self, forces: &[f64]) -> PressureResult {
        let cells = self.cells();
        let forces = &self.clamping(forces);
        PressureResult {
            peak: cells.peak_pressure(forces),
            contact_area: cells.contact_area(),
            radius_95: cells.radius_holding(0.95, forces),
            force: cells.force_carried(forces),
            gap_max: None,
            gap_mean: None,
            solved: None,
        }
    }

    /// Cautions of the closed form that do not depend on the force, each once.
    pub(super) fn cautions(&self) -> Vec<Caution> {
        let mut found: Vec<Caution> = Vec::new();
        for caution in self.geometry.pairs.iter().filter_map(Pair::caution) {
            if !found.contains(&caution) {
                found.push(caution);
            }
        }
        found
    }
}
