//! What an engineer reads off the field of a round pair.

use crate::{numerics::elements::edge_points, pressure::round::Solution};

impl Solution {
    /// Highest pressure under a clamp force, Pa.
    pub fn peak(&self, force: f64) -> f64 {
        force * self.pressure_per_force.iter().copied().fold(0.0, f64::max)
    }

    /// Mean pressure as the force meets it under a clamp force, Pa: `∫ p² dA/∫ p dA`.
    pub fn mean_pressure(&self, force: f64) -> f64 {
        let square = self.integral(|radius| self.pressure(radius, force).powi(2));
        square / self.integral(|radius| self.pressure(radius, force))
    }

    /// Mean distance of the force from the axis, m: `∫ p r dA/∫ p dA`.
    ///
    /// Checked: `readings_of_a_straight_field_are_exact`.
    pub fn mean_force_radius(&self) -> f64 {
        let moment = self.integral(|radius| self.pressure(radius, 1.0) * radius);
        moment / self.integral(|radius| self.pressure(radius, 1.0))
    }

    /// Widest gap under a clamp force, m.
    pub fn gap_max(&self, force: f64) -> f64 {
        force * self.gap_per_force.iter().copied().fold(0.0, f64::max)
    }

    /// Mean gap over the whole faces under a clamp force, m; contact counts as 0.
    ///
    /// Checked: `readings_of_a_straight_field_are_exact`.
    pub fn gap_mean(&self, force: f64) -> f64 {
        self.integral(|radius| self.gap(radius, force)) / self.integral(|_| 1.0)
    }

    /// Integral over the faces; exact for polynomials between the grid lines.
    fn integral(&self, value: impl Fn(f64) -> f64) -> f64 {
        self.radii
            .windows(2)
            .flat_map(|line| edge_points([line[0], line[1]]))
            .map(|point| point.area * value(point.radius))
            .sum()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::pressure::round::Health;

    #[test]
    fn readings_of_a_straight_field_are_exact() {
        // p = 2 − r from 1 to 2, gap = r − 2 from 2 to 3, per newton.
        let field = Solution {
            contact_radius: 2.0,
            radii: vec![1.0, 2.0, 3.0],
            pressure_per_force: vec![1.0, 0.0, 0.0],
            gap_per_force: vec![0.0, 0.0, 1.0],
            health: Health {
                force_balance: 0.0,
                smallest_pressure_inside: 0.0,
                smallest_gap_outside: 1.0,
                iterations: 1,
                remeshes: 0,
                unknowns: 6,
            },
        };
        let near = |found: f64, exact: f64| {
            // Rounding of a handful of products.
            assert!((found / exact - 1.0).abs() < 1e-14, "{found} for {exact}");
        };
        // Over 2π: ∫ p r dr = 2/3, ∫ p r² dr = 11/12, ∫ p² r dr = 5/12, ∫ gap r dr = 4/3, ∫ r dr = 4.
        near(field.mean_force_radius(), 11.0 / 8.0);
        near(field.mean_pressure(3.0), 3.0 * 5.0 / 8.0);
        near(field.gap_mean(2.0), 2.0 / 3.0);
        near(field.gap_max(2.0), 2.0);
        near(field.peak(2.0), 2.0);
    }
}
