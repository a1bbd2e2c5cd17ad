//! The solved field of one bolt in a round pair.

use std::f64::consts::PI;

use crate::numerics::roots;

/// Pressure and gap between two annular plates, per unit of clamp force.
#[derive(Clone, Debug, PartialEq)]
pub struct Solution {
    /// Radius where contact ends, m; the rim where the plates touch all over.
    pub contact_radius: f64,
    /// Radii of the grid lines, m, rising from hole to rim.
    pub radii: Vec<f64>,
    /// Pressure on the grid lines over the clamp force, 1/m²; straight between them.
    pub pressure_per_force: Vec<f64>,
    /// Gap at the grid lines over the clamp force, m/N; 0 in contact.
    pub gap_per_force: Vec<f64>,
    /// How good the solution is.
    pub health: Health,
}

/// What a solution must satisfy, measured on it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Health {
    /// Force carried by the interface over the clamp force, less 1.
    pub force_balance: f64,
    /// Smallest pressure on a touching grid line over the clamp force, 1/m².
    pub smallest_pressure_inside: f64,
    /// Smallest gap at a parted grid line over the clamp force, m/N; infinite where none is.
    pub smallest_gap_outside: f64,
    /// Systems solved by the active set, over all grids.
    pub iterations: usize,
    /// Grids made after the first.
    pub remeshes: usize,
    /// Unknown displacements and pressures on the last grid.
    pub unknowns: usize,
}

impl Solution {
    /// Pressure at a radius under a clamp force, Pa; zero off the contact.
    pub fn pressure(&self, radius: f64, force: f64) -> f64 {
        force * self.between(&self.pressure_per_force, radius)
    }

    /// Distance between the faces at a radius under a clamp force, m; zero in contact and off the
    /// plates.
    pub fn gap(&self, radius: f64, force: f64) -> f64 {
        force * self.between(&self.gap_per_force, radius)
    }

    /// Share of the clamp force carried inside a radius, 0 to 1.
    pub fn carried_within(&self, radius: f64) -> f64 {
        let mut carried = 0.0;
        for (radii, p) in self
            .radii
            .windows(2)
            .zip(self.pressure_per_force.windows(2))
        {
            if radius <= radii[0] {
                break;
            }
            let slope = (p[1] - p[0]) / (radii[1] - radii[0]);
            let constant = p[0] - slope * radii[0];
            let end = radius.min(radii[1]);
            let moment = |r: f64| r * r * (constant / 2.0 + slope * r / 3.0);
            carried += 2.0 * PI * (moment(end) - moment(radii[0]));
        }
        carried
    }

    /// Radius inside which a share of the force is carried, m.
    pub fn radius_holding(&self, share: f64) -> f64 {
        let inside = |radius: f64| self.carried_within(radius) < share;
        roots::halved(inside, self.radii[0], self.contact_radius)
    }

    fn between(&self, values: &[f64], radius: f64) -> f64 {
        let last = self.radii.len() - 1;
        if !(self.radii[0] <= radius && radius <= self.radii[last]) {
            return 0.0;
        }
        let right = self.radii[1..last].partition_point(|line| *line < radius) + 1;
        let (r0, r1) = (self.radii[right - 1], self.radii[right]);
        let x = (radius - r0) / (r1 - r0);
        values[right - 1] * (1.0 - x) + values[right] * x
    }
}
