//! The error of a starved grid, found on a small lattice of one of its bolts, where a fine grid
//! costs little.

use std::sync::Arc;

use crate::{
    joint::{Outline, Sink, Source, Zone},
    resistance::{
        cells::{Plan, Site, cells},
        failure::Failure,
        path::Load,
        plan_grid::{PlanGrid, within},
    },
};

/// Pitch of the lattice, at least so many contact radii.
const LEAST_PITCH: f64 = 2.5;
/// Bolts along each side of the lattice: so many that lines lie by each of them differently.
const SIDE: usize = 5;

/// Share of the difference to half of the lines that is left at order 1.5, 0.55, and some more.
const LEFT: f64 = 0.65;

impl PlanGrid {
    /// Relative error of what the joint adds, as found on a lattice of bolts like the one of the
    /// narrowest contact, each with its share of the plates.
    ///
    /// A grid without enough lines for its bolts errs nearly as much as one with half of them, so
    /// the difference between the two says little. The lattice gets the lines asked for and half of
    /// them; what is off there grows towards the granted lines at second order, which is more than
    /// lattices of 36 and 64 bolts showed (order 1.5).
    pub fn error_on_a_lattice<H: Fn(f64) -> f64 + Sync>(
        &self,
        load: &Load<H>,
    ) -> Result<f64, Failure> {
        let plan = &self.cells.plan;
        let ring = |site: &Site| site.cone.contact_radius - site.cone.hole_radius;
        let narrowest = plan
            .sites
            .iter()
            .enumerate()
            .min_by(|(_, one), (_, other)| ring(one).total_cmp(&ring(other)));
        let Some((bolt, site)) = narrowest else {
            return Ok(0.0);
        };
        let share = (self.cells.interface_area / plan.sites.len() as f64).sqrt();
        let pitch = share.max(LEAST_PITCH * site.cone.contact_radius);
        let outline = Outline::Rectangle {
            size: [SIDE as f64 * pitch; 2],
        };
        let place = |index: usize| (index as f64 + 0.5) * pitch;
        let lattice = Arc::new(cells(&Plan {
            outlines: [(outline.clone(), [0.0; 2]), (outline, [0.0; 2])],
            thickness: plan.thickness,
            empty: Vec::new(),
            sites: (0..SIDE * SIDE)
                .map(|index| Site {
                    at: [place(index % SIDE), place(index / SIDE)],
                    ..*site
                })
                .collect(),
            source: Source {
                zone: Zone::Face,
                isothermal: false,
            },
            sink: Sink::IsothermalBack,
            rings: plan.rings,
        })?);
        let forces = [load.forces[bolt]; SIDE * SIDE];
        let shanks = [load.shanks[bolt]; SIDE * SIDE];
        let there = Load {
            conductance: &load.conductance,
            conductivity: load.conductivity,
            forces: &forces,
            shanks: &shanks,
        };
        let added = |fineness: f64| -> Result<f64, Failure> {
            let grid = within(&lattice, fineness, f64::INFINITY)?;
            Ok(grid.solve(&there)?.added_by_joint)
        };
        let halved = (added(0.5 * self.asked)? / added(self.asked)? - 1.0).abs();
        Ok(LEFT * halved * (self.asked / self.fineness).powi(2))
    }
}
