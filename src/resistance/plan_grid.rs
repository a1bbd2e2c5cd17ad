//! Heat through both plates on one plan grid: bolts share the plates as they really do.
//!
//! Each grid cell has one mean temperature per plate and the columns of the ring network; plate
//! edges and holes are partial cells. No borders between bolts, so neither the too wide nor the
//! too narrow ways of the cells; an estimate from no certain side.

mod around;
mod cover;
mod filling;
mod lines;

use std::sync::Arc;

use lines::Axis;

use crate::{
    joint::Sink,
    numerics::block_grid::Sheets,
    resistance::{
        cells::Cells,
        column::{Columns, Coupling, Flow, Inlet, Plates},
        failure::Failure,
        path::{Load, Path, Whole},
        rings::Patches,
    },
};

/// What this network is called in a failure.
const GRID: &str = "the plan grid";
/// Its solver.
const SOLVER: &str = "the plan grid, by conjugate gradients,";
/// Nodes that are always granted, at fineness 1; ten bolts need fewer.
const FEW_NODES: f64 = 10_000.0;
/// Nodes granted for each bolt, at fineness 1: enough for every bolt of a lattice at twelve times
/// its thread, and for bolts that stand in no rows at half of it.
const NODES_PER_BOLT: f64 = 1200.0;
/// Most nodes at fineness 1: at the usual fineness a few seconds and some hundred megabytes.
const MOST_NODES: f64 = 1_000_000.0;

/// Both plates of a joint on one graded grid, ready for any load.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanGrid {
    cells: Arc<Cells>,
    /// Fineness asked for.
    asked: f64,
    /// What was granted of it.
    fineness: f64,
    size: [usize; 2],
    columns: Columns,
    patches: Patches,
    /// Patches under a head and the bolt it belongs to.
    under_head: Vec<(usize, usize)>,
    head_area: Vec<f64>,
    /// Width over distance of the links along both axes, for both plates.
    shape: Vec<[[f64; 2]; 2]>,
    /// Width over distance to the rim of the second plate.
    rim_shape: Vec<f64>,
}

/// The plates in perfect contact: what no force and no face moves.
#[derive(Clone, Copy, Debug)]
pub struct Perfect {
    conductivity: [f64; 2],
    whole: Whole,
}

/// Puts a plan on a grid; fineness 1 is the normal one, 2 halves every cell.
///
/// Every bolt gets the lines that a few get, up to a number of nodes that is solved in seconds;
/// beyond it the grid is coarser than asked, and `is_starved` says so.
pub fn plan_grid(cells: &Arc<Cells>, fineness: f64) -> Result<PlanGrid, Failure> {
    let bolts = cells.plan.sites.len() as f64;
    let most = (NODES_PER_BOLT * bolts).clamp(FEW_NODES, MOST_NODES) * fineness * fineness;
    within(cells, fineness, most)
}

/// A grid of no more than a number of nodes.
fn within(cells: &Arc<Cells>, fineness: f64, most: f64) -> Result<PlanGrid, Failure> {
    let plan = &cells.plan;
    let axes = [0, 1].map(|axis| Axis::new(plan, axis));
    let count = |fineness: f64| (axes[0].count(fineness) * axes[1].count(fineness)) as f64;
    let mut granted = fineness;
    while count(granted) > most && granted > 1e-3 * fineness {
        granted *= 0.95;
    }
    let lines = [0, 1].map(|axis| axes[axis].lines(granted));
    let size = [lines[0].len() - 1, lines[1].len() - 1];
    let (columns, patches) = filling::columns();
    let mut grid = PlanGrid {
        size,
        asked: fineness,
        fineness: granted,
        columns,
        patches,
        under_head: Vec::new(),
        head_area: vec![0.0; plan.sites.len()],
        shape: vec![[[0.0; 2]; 2]; size[0] * size[1]],
        rim_shape: vec![0.0; size[0] * size[1]],
        cells: cells.clone(),
    };
    grid.fill(&lines)?;
    Ok(grid)
}

impl Perfect {
    /// Whether this is the perfect contact of plates of these conductivities, W/(m K).
    pub fn serves(&self, conductivity: [f64; 2]) -> bool {
        (0..2).all(|plate| {
            let off = self.conductivity[plate] / conductivity[plate] - 1.0;
            off.abs() < 1e-12
        })
    }
}

impl PlanGrid {
    /// Whether the bolts would need more nodes than are granted.
    pub fn is_starved(&self) -> bool {
        self.fineness < self.asked
    }

    /// The same plan with cells twice as wide: what a comparison needs.
    pub fn coarser(&self) -> Result<Self, Failure> {
        within(&self.cells, 0.5 * self.fineness, f64::INFINITY)
    }

    /// The resistances under a load, with the heat free to choose its way through the plates.
    ///
    /// Contact, lower and upper bound are those of the cells.
    /// Checked: `round_joint_agrees_with_the_ring_network`, `plan_grid_meets_the_reference_cases`.
    pub fn solve<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Result<Path, Failure> {
        self.solve_both(load).map(|(path, _)| path)
    }

    /// The same with perfect contact for later use.
    pub fn solve_both<H: Fn(f64) -> f64>(
        &self,
        load: &Load<H>,
    ) -> Result<(Path, Perfect), Failure> {
        let conductance = self.conductance(load);
        let conductivity = load.conductivity;
        let plates = self.cells.plates(conductivity);
        // The two systems know nothing of each other, so both cores can have one.
        let (whole, perfect) = rayon::join(
            || self.whole(&plates, &conductance),
            || self.perfect(conductivity),
        );
        let perfect = perfect?;
        let path = self.cells.path(load, &whole?, &perfect.whole);
        path.checked(GRID)?;
        Ok((path, perfect))
    }

    /// The same where perfect contact is known already for these conductivities.
    pub fn solve_beside<H: Fn(f64) -> f64>(
        &self,
        load: &Load<H>,
        perfect: &Perfect,
    ) -> Result<Path, Failure> {
        let whole = self.whole(
            &self.cells.plates(load.conductivity),
            &self.conductance(load),
        )?;
        let path = self.cells.path(load, &whole, &perfect.whole);
        path.checked(GRID)?;
        Ok(path)
    }

    /// Both plates in perfect contact.
    fn perfect(&self, conductivity: [f64; 2]) -> Result<Perfect, Failure> {
        let met = vec![f64::INFINITY; self.columns.patch_area.len()];
        Ok(Perfect {
            conductivity,
            whole: self.whole(&self.cells.plates(conductivity), &met)?,
        })
    }

    /// Source to sink alone, K/W: what a comparison of two grids needs.
    ///
    /// ```text
    /// R = (T̄_source − T̄_sink)/Q,   Σ_neighbours k t (T_i − T_j) + h_ij A_i (T_i − T′_i) = q_i A_i
    /// ```
    ///
    /// Valid: plates thin against the spacing of their bolts, so that each is one sheet on the plan.
    pub fn source_to_sink<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Result<f64, Failure> {
        let plates = self.cells.plates(load.conductivity);
        let whole = self.whole(&plates, &self.conductance(load))?;
        Ok(whole.source - self.cells.film_drop())
    }

    fn conductance<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Vec<f64> {
        let open = (load.conductance)(0.0);
        let mut conductance: Vec<f64> = (0..self.columns.patch_area.len())
            .map(|patch| match self.patches.of(patch) {
                [] => open,
                _ => (load.conductance)(self.patches.pressure(patch, load.forces)),
            })
            .collect();
        for (patch, bolt) in &self.under_head {
            conductance[*patch] += load.shanks[*bolt] / self.head_area[*bolt];
        }
        conductance
    }

    fn whole(&self, plates: &Plates, conductance: &[f64]) -> Result<Whole, Failure> {
        let flow = self.flow(plates, conductance)?;
        Ok(flow.map_or(Whole::BLOCKED, |flow| self.cells.whole_of(&flow)))
    }

    /// None when no path leads from one plate to the other.
    fn flow(&self, plates: &Plates, conductance: &[f64]) -> Result<Option<Flow>, Failure> {
        let constants = plates.constants();
        let count = self.columns.count();
        let couplings: Vec<Coupling> = (0..count)
            .map(|node| self.columns.couple(node, &constants, conductance))
            .collect();
        let joined: f64 = couplings.iter().map(Coupling::total).sum();
        if joined <= 0.0 {
            return Ok(None);
        }
        let mut sheets = Sheets::new(self.size[0], self.size[1]);
        let mut heat = vec![[0.0; 2]; count];
        for node in 0..count {
            for axis in 0..2 {
                for plate in 0..2 {
                    let shape = self.shape[node][axis][plate];
                    if shape > 0.0 {
                        sheets.link((node, axis), plate, constants.sheet[plate] * shape);
                    }
                }
            }
        }
        for node in 0..count {
            if self.cells.plan.sink == Sink::Rim && self.columns.plate_area[1][node] > 0.0 {
                sheets.blocks[node][2] += constants.sheet[1] * self.rim_shape[node];
            }
            self.columns.fill(
                node,
                &constants,
                &couplings[node],
                (&mut sheets.blocks[node], &mut heat[node]),
            );
            for (plate, heat) in heat[node].iter().enumerate() {
                // Nothing of the plate is here, or it hangs on nothing: a node of its own.
                if sheets.blocks[node][2 * plate] <= 0.0 {
                    sheets.blocks[node][2 * plate] = 1.0;
                    if heat.abs() > 0.0 {
                        return Err(Failure::NotFinite {
                            network: GRID,
                            reading: "heat into a place that hangs on nothing",
                            value: *heat,
                        });
                    }
                }
            }
        }
        let temperatures = sheets
            .solution(&heat)
            .map_err(|stopped| Failure::NotSolved {
                solver: SOLVER,
                rounds: stopped.rounds,
                residual: stopped.residual,
            })?;
        let mut flow = Flow {
            hottest: f64::NEG_INFINITY,
            ..Flow::default()
        };
        for (node, mean) in temperatures.into_iter().enumerate() {
            self.columns
                .read(node, &constants, (&couplings[node], mean), &mut flow);
        }
        debug_assert!(plates.inlet != Inlet::Rim, "joints are heated on a face");
        Ok(Some(flow))
    }
}

#[cfg(test)]
mod tests;
