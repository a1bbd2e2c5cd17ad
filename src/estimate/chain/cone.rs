//! The chain on closed forms and networks: cones, ring sums, plan grid.

use std::sync::Arc;

use crate::{
    diagnostic::Caution,
    estimate::{
        Chain, Failure, PressureResult, Realisation,
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
        let solved = self.cells().solve(&conditions.load());
        let path = match self.levels.get(case) {
            Some(level) => level.calibration.applied(solved),
            None => solved,
        };
        with_form(path, self.form.at(at.field))
    }

    /// The pressure field under the forces of the bolts, N.
    pub(super) fn pressure(&self, forces: &[f64]) -> PressureResult {
        let cells = self.cells();
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
