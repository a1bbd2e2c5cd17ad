//! Elastic contact of two round plates around one bolt: where they touch and how hard.

use std::f64::consts::PI;

use crate::{
    joint::{ConeRule, ConeShape},
    pressure::{Pair, cone},
};

mod contact;
mod edge;
mod mesh;
mod plate;
mod readings;
mod search;
mod solution;

pub use crate::joint::{FaceFriction, HeadModel};
pub use solution::{Health, Solution};

use contact::{Contact, contact};
use edge::contact_edge;
use mesh::Mesh;
use search::Search;

/// Two coaxial annular plates clamped between two heads.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Problem {
    /// Radius of the holes, m; 0 for plates without a hole.
    pub hole_radius: f64,
    /// Outer radius of the annulus that each head presses, m.
    pub bearing_radius: f64,
    /// Radius at which the plates end, m; at least the bearing radius.
    pub rim_radius: f64,
    /// Thickness of both plates, m.
    pub thickness: [f64; 2],
    /// Young's modulus E of both plates, Pa.
    pub youngs_modulus: [f64; 2],
    /// Poisson's ratio ν of both plates, 1; below 0.5.
    pub poisson: [f64; 2],
    /// How the heads press.
    pub head: HeadModel,
    /// How the faces meet.
    pub faces: FaceFriction,
    /// Error allowed in the contact radius, in bearing radii.
    pub tolerance: f64,
}

/// A solver gave up.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
#[error("{solver} did not converge in {iterations} iterations (residual {residual:.2e})")]
pub struct NotConverged {
    /// Which solver.
    pub solver: &'static str,
    /// Iterations done.
    pub iterations: usize,
    /// What was left, in the solver's own measure.
    pub residual: f64,
}

/// Smallest tolerance: below it the grids outgrow their use.
const FINEST_TOLERANCE: f64 = 1e-4;
/// Width behind the edge over which p² is fitted, in thicknesses or bearing radii, whichever is less.
const EDGE_REACH: f64 = 0.25;
/// Grids after which the edge counts as not found.
const MOST_GRIDS: usize = 16;
/// Tolerance for which the spacings of the grid were found, in bearing radii.
const USUAL_TOLERANCE: f64 = 0.003;
/// Spacing of the first grid over that of the last.
const FIRST_COARSENESS: f64 = 1.8;
/// Move of the edge, in tolerances, below which the grid is left as it is.
const STILL: f64 = 0.25;

/// Solves the receding contact; pressure and gap come out per unit of clamp force.
///
/// ```text
/// linear elasticity in both plates, heads press F on a ≤ r ≤ b, rims and holes free
/// between the faces   p ≥ 0,  gap ≥ 0,  p · gap = 0;   ∫ p dA = F
/// ```
///
/// Eight-node ring elements on a grid with lines at a, b and the contact edge c; pressure straight
/// between grid lines; every plate condensed to its faces by one elimination; complementarity by
/// an active set. c from p² behind the edge, and a new grid until it stays put. Without initial gap
/// the contact does not depend on the force: the solution scales with it.
///
/// Valid: the input describes plates (0 ≤ a < b ≤ rim, positive thicknesses and moduli,
/// ν < 0.5); anything else ends in an error or a meaningless number, never in a panic.
/// Source: variational form of linear elasticity with unilateral contact; square-root edge from
/// the theory of receding contact.
/// Checked: `public_cases_are_met`, `layer_radii_are_met`, `equal_rims_carry_the_mean_pressure`.
pub fn solve(problem: &Problem) -> Result<Solution, NotConverged> {
    let unit = problem.scaled();
    unit.check()?;
    let finest = (problem.tolerance / USUAL_TOLERANCE).powf(0.6);
    let reach = EDGE_REACH * unit.thickness[0].min(unit.thickness[1]).min(1.0);
    let still = STILL * problem.tolerance;
    let mut search = Search::from(unit.guess());
    let mut effort = Effort::default();
    let mut moved = f64::NAN;
    for grid in 0..MOST_GRIDS {
        let coarseness = if grid == 0 { FIRST_COARSENESS } else { 1.0 };
        let mesh = Mesh::new(&unit, search.edge, finest * coarseness);
        let contact = contact(&unit, &mesh)?;
        effort.iterations += contact.iterations;
        effort.remeshes = grid;
        let found = contact_edge(&mesh.radii, &contact.pressure, reach);
        if grid == 0 {
            search = Search::from(found);
            continue;
        }
        moved = search.narrow(found);
        // One move of a sluggish edge tells nothing yet.
        if moved <= still && (grid > 1 || unit.faces == FaceFriction::Frictionless) {
            return Ok(problem.solution(&Outcome {
                mesh,
                contact,
                edge: search.edge.min(unit.rim_radius),
                effort,
            }));
        }
        search.edge = search.edge.min(unit.rim_radius);
    }
    Err(NotConverged {
        solver: "search for the contact edge",
        iterations: MOST_GRIDS,
        residual: moved,
    })
}

/// What stands after the last grid, for bearing radius 1 and mean head pressure 1.
struct Outcome {
    mesh: Mesh,
    contact: Contact,
    edge: f64,
    effort: Effort,
}

/// Work done over all grids.
#[derive(Default)]
struct Effort {
    iterations: usize,
    remeshes: usize,
}

impl Problem {
    /// The same problem with bearing radius 1 and first Young's modulus 1.
    fn scaled(&self) -> Self {
        let (length, modulus) = (self.bearing_radius, self.youngs_modulus[0]);
        Self {
            hole_radius: self.hole_radius / length,
            bearing_radius: 1.0,
            rim_radius: self.rim_radius / length,
            thickness: self.thickness.map(|thickness| thickness / length),
            youngs_modulus: self.youngs_modulus.map(|value| value / modulus),
            ..*self
        }
    }

    /// Contact radius by the closed form, where the search starts.
    fn guess(&self) -> f64 {
        let plane = |plate: usize| self.youngs_modulus[plate] / (1.0 - self.poisson[plate].powi(2));
        let pair = Pair {
            hole_radius: self.hole_radius,
            bearing_radius: self.bearing_radius,
            rim_radius: self.rim_radius,
            thickness: self.thickness,
            plane_modulus: [plane(0), plane(1)],
        };
        cone(&pair, ConeRule::Fitted, ConeShape::Fitted).contact_radius
    }

    /// Refuses what no grid can be laid over, for bearing radius 1.
    fn check(&self) -> Result<(), NotConverged> {
        let positive = |values: [f64; 2]| values.iter().all(|x| *x > 0.0 && x.is_finite());
        let sound = 0.0 <= self.hole_radius
            && self.hole_radius < 1.0
            && 1.0 <= self.rim_radius
            && self.rim_radius.is_finite()
            && positive(self.thickness)
            && positive(self.youngs_modulus)
            && self
                .poisson
                .iter()
                .all(|ratio| -1.0 < *ratio && *ratio < 0.5)
            && FINEST_TOLERANCE <= self.tolerance
            && self.tolerance.is_finite();
        if sound {
            Ok(())
        } else {
            Err(NotConverged {
                solver: "grid of the plates",
                iterations: 0,
                residual: f64::NAN,
            })
        }
    }

    /// The solution in the problem's own units.
    fn solution(&self, outcome: &Outcome) -> Solution {
        let Outcome {
            mesh,
            contact,
            edge,
            effort,
        } = outcome;
        let length = self.bearing_radius;
        let area = PI * (length.powi(2) - self.hole_radius.powi(2));
        let per_force = area.recip();
        let gap_per_force = per_force * length / self.youngs_modulus[0];
        let scaled = |values: &[f64], unit: f64| values.iter().map(|x| x * unit).collect();
        let smallest = |values: &[f64], touching: bool| {
            let chosen = values.iter().zip(&contact.touches);
            chosen
                .filter(|(_, touches)| **touches == touching)
                .fold(f64::INFINITY, |least, (value, _)| least.min(*value))
        };
        Solution {
            contact_radius: edge * length,
            radii: scaled(&mesh.radii, length),
            pressure_per_force: scaled(&contact.pressure, per_force),
            gap_per_force: scaled(&contact.gap, gap_per_force),
            health: Health {
                force_balance: contact.force_balance,
                smallest_pressure_inside: per_force * smallest(&contact.pressure, true),
                smallest_gap_outside: gap_per_force * smallest(&contact.gap, false),
                iterations: effort.iterations,
                remeshes: effort.remeshes,
                unknowns: contact.unknowns,
            },
        }
    }
}
