//! Heat conduction in the quadratic ring element, and points along its edges.

use std::f64::consts::PI;

use crate::numerics::elements::{NODES, POINTS, Ring};

/// Conductance matrix between the nodes of one element.
pub type Conduction = [[f64; NODES]; NODES];

/// Points and weights of Gauss's rule of order 5 on −1 … 1.
const GAUSS_FIVE: [(f64, f64); 5] = [
    (-0.906_179_845_938_664, 0.236_926_885_056_189_08),
    (-0.538_469_310_105_683, 0.478_628_670_499_366_47),
    (0.0, 128.0 / 225.0),
    (0.538_469_310_105_683, 0.478_628_670_499_366_47),
    (0.906_179_845_938_664, 0.236_926_885_056_189_08),
];

/// A point of a quadrature rule along an edge between two radii.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EdgePoint {
    /// Its radius.
    pub radius: f64,
    /// Area of the ring it stands for.
    pub area: f64,
    /// The three quadratic shape functions there: inner end, middle, outer end.
    pub shapes: [f64; 3],
}

impl Ring {
    /// Conductance of the whole ring.
    ///
    /// ```text
    /// ∫ (k_r ∂φ/∂r ∂ψ/∂r + k_z ∂φ/∂z ∂ψ/∂z) 2πr dr dz
    /// ```
    ///
    /// Conductivities k along the radius and along the axis. Nine Gauss points: exact on rectangles.
    /// Checked: `linear_fields_have_their_dissipation`, `level_temperatures_drive_no_heat`.
    pub fn conduction(&self, [radial, axial]: [f64; 2]) -> Conduction {
        let mut matrix = [[0.0; NODES]; NODES];
        let half = [self.radii, self.heights].map(|[low, high]| 0.5 * (high - low));
        let middle = 0.5 * (self.radii[0] + self.radii[1]);
        for point in POINTS.iter() {
            let radius = middle + half[0] * point.xi;
            let weight = point.weight * 2.0 * PI * radius * half[0] * half[1];
            let (along, through) = (
                weight * radial / half[0].powi(2),
                weight * axial / half[1].powi(2),
            );
            for (i, line) in matrix.iter_mut().enumerate() {
                let (by_r, by_z) = (along * point.by_xi[i], through * point.by_eta[i]);
                for (j, value) in line.iter_mut().enumerate().take(i + 1) {
                    *value += by_r * point.by_xi[j] + by_z * point.by_eta[j];
                }
            }
        }
        for row in 1..NODES {
            let (above, rest) = matrix.split_at_mut(row);
            for (column, line) in above.iter_mut().enumerate() {
                line[row] = rest[0][column];
            }
        }
        // Level temperatures drive no heat at all, not even by rounding.
        for (row, line) in matrix.iter_mut().enumerate() {
            line[row] = 0.0;
            line[row] = -line.iter().sum::<f64>();
        }
        matrix
    }

    /// ∫ φ 2πr dr dz of every shape function: the volume that each node stands for.
    pub fn volumes(&self) -> [f64; NODES] {
        let mut volumes = [0.0; NODES];
        let half = [self.radii, self.heights].map(|[low, high]| 0.5 * (high - low));
        let middle = 0.5 * (self.radii[0] + self.radii[1]);
        for point in POINTS.iter() {
            let radius = middle + half[0] * point.xi;
            let weight = point.weight * 2.0 * PI * radius * half[0] * half[1];
            for (volume, value) in volumes.iter_mut().zip(point.value) {
                *volume += weight * value;
            }
        }
        volumes
    }
}

/// Five Gauss points between two radii: exact for area times polynomials of degree eight.
pub fn edge_points([inner, outer]: [f64; 2]) -> [EdgePoint; 5] {
    GAUSS_FIVE.map(|(xi, weight)| {
        let radius = 0.5 * (inner + outer) + 0.5 * (outer - inner) * xi;
        EdgePoint {
            radius,
            area: weight * PI * radius * (outer - inner),
            shapes: [0.5 * xi * (xi - 1.0), 1.0 - xi * xi, 0.5 * xi * (xi + 1.0)],
        }
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numerics::elements::PLACES;

    const RING: Ring = Ring {
        radii: [0.8, 1.3],
        heights: [-0.2, 0.5],
    };

    fn sampled(field: impl Fn(f64, f64) -> f64) -> [f64; NODES] {
        PLACES.map(|[xi, eta]| field(1.05 + 0.25 * xi, 0.15 + 0.35 * eta))
    }

    fn volume() -> f64 {
        PI * (1.3_f64.powi(2) - 0.8_f64.powi(2)) * 0.7
    }

    #[test]
    fn linear_fields_have_their_dissipation() {
        let matrix = RING.conduction([2.0, 5.0]);
        let field = sampled(|r, z| 0.3 * r - 1.1 * z);
        let mut found = 0.0;
        for (row, line) in matrix.iter().enumerate() {
            for (column, value) in line.iter().enumerate() {
                found += field[row] * value * field[column];
            }
        }
        let wanted = (2.0 * 0.09 + 5.0 * 1.21) * volume();
        // Rounding of sixty-four products.
        assert!((found / wanted - 1.0).abs() < 1e-13, "{found} {wanted}");
    }

    #[test]
    fn level_temperatures_drive_no_heat() {
        for line in RING.conduction([2.0, 5.0]) {
            assert!(line.iter().sum::<f64>().abs() < 1e-12, "{line:?}");
        }
    }

    #[test]
    fn volumes_and_areas_add_up() {
        let sum: f64 = RING.volumes().iter().sum();
        assert!((sum / volume() - 1.0).abs() < 1e-14);
        let moment: f64 = RING
            .volumes()
            .iter()
            .zip(sampled(|r, _| r))
            .map(|(volume, r)| volume * r)
            .sum();
        let wanted = 2.0 * PI * (1.3_f64.powi(3) - 0.8_f64.powi(3)) / 3.0 * 0.7;
        assert!((moment / wanted - 1.0).abs() < 1e-14);
        // ∫ r⁷ 2πr dr, the highest degree that five points hold with the radius in the area.
        let points = edge_points([0.8, 1.3]);
        let found: f64 = points.iter().map(|p| p.area * p.radius.powi(8)).sum();
        let wanted = 2.0 * PI * (1.3_f64.powi(10) - 0.8_f64.powi(10)) / 10.0;
        assert!((found / wanted - 1.0).abs() < 1e-13);
        for point in points {
            assert!((point.shapes.iter().sum::<f64>() - 1.0).abs() < 1e-15);
        }
    }
}
