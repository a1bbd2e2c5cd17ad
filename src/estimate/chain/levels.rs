//! The level of the plan grid, carried over to the cells case by case, and its error.

use crate::{
    estimate::{Chain, Failure, Realisation, State, chain::cone::ConeModel},
    resistance::{self, Calibration, Perfect},
};

/// Fineness of the plan grid: within 1.5 % of a grid three times as fine on the six-bolt demo.
pub(super) const FINENESS: f64 = 0.6;
/// Relative difference of conductivity below which two cases share a calibration.
const ALIKE: f64 = 0.01;
/// Numerical error above which the reader is told.
pub const LARGE_ERROR: f64 = 0.05;

/// What the plan grid makes of the cells' answer in one case.
#[derive(Clone, Debug)]
pub(super) struct Level {
    conductivity: Vec<f64>,
    perfect: Perfect,
    pub(super) calibration: Calibration,
}

impl ConeModel {
    /// Holds the cells against the plan grid at the nominal inputs of each case.
    ///
    /// A case whose plates conduct as those of an earlier one takes its calibration: what is left
    /// between them, force and faces, the cells follow by themselves. Perfect contact knows neither
    /// force nor face, so the levels of another torque or medium still serve for it.
    pub(super) fn calibrated(
        &self,
        chain: &Chain,
        others: &[Level],
    ) -> Result<Vec<Level>, Failure> {
        let mut known: Vec<Level> = Vec::new();
        let Some(grid) = &self.geometry.grid else {
            return Ok(known);
        };
        for case in 0..chain.joint().service.cases.len() {
            let nominal = chain.conditions(case, &Realisation::default())?;
            let alike = known.iter().find(|level| {
                level
                    .conductivity
                    .iter()
                    .zip(&nominal.conductivity)
                    .all(|(one, other)| (one / other - 1.0).abs() < ALIKE)
            });
            if let Some(level) = alike.cloned() {
                known.push(level);
                continue;
            }
            let failed = |found| chain.network(case, found);
            let clamped = self.clamped(&nominal);
            let load = clamped.load();
            let cells = self.geometry.cells.solve(&load);
            let there = others
                .iter()
                .map(|level| level.perfect)
                .find(|perfect| perfect.serves(load.conductivity));
            let (path, perfect) = match there {
                Some(perfect) => (grid.solve_beside(&load, &perfect).map_err(failed)?, perfect),
                None => grid.solve_both(&load).map_err(failed)?,
            };
            known.push(Level {
                conductivity: nominal.conductivity.clone(),
                perfect,
                calibration: Calibration::between(&cells, &path).map_err(failed)?,
            });
        }
        Ok(known)
    }

    /// Error of the discretisation at the nominal state of the first case, relative to source to
    /// sink.
    ///
    /// All against half of the lines or rings; both networks are of second order in the spacing, so
    /// a third of the difference is left (six-bolt demo: 1.5 % against 1.3 % to a grid three times
    /// as fine). Where so many bolts stand that the grid is coarser than it should be, the order is
    /// not to be relied on: the whole difference is told, or what a lattice of these bolts tells.
    pub(super) fn discretisation_error(
        &self,
        chain: &Chain,
        state: &State,
    ) -> Result<f64, Failure> {
        let clamped = self.clamped(&state.conditions);
        let load = clamped.load();
        let failed = |found| chain.network(0, found);
        let error = match &self.geometry.grid {
            None => self.geometry.cells.ring_error(&load).map_err(failed)? / 3.0,
            Some(grid) => {
                let coarse = grid
                    .coarser()
                    .and_then(|coarse| coarse.source_to_sink(&load));
                let coarse = coarse.map_err(failed)?;
                let difference = (coarse / state.path.source_to_sink - 1.0).abs();
                if grid.is_starved() {
                    let share = state.path.added_by_joint / state.path.source_to_sink;
                    let around = grid.error_on_a_lattice(&load).map_err(failed)?;
                    difference.max(share * around)
                } else {
                    difference / 3.0
                }
            }
        };
        if error.is_finite() {
            Ok(error)
        } else {
            Err(failed(resistance::Failure::NotFinite {
                network: "the comparison with a coarser grid",
                reading: "numerical error",
                value: error,
            }))
        }
    }
}
