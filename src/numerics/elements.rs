//! Quadratic ring element of rectangular section: axisymmetric linear elasticity and conduction.

use std::{f64::consts::PI, sync::LazyLock};

mod conduction;

pub use conduction::{Conduction, EdgePoint, edge_points};

/// Nodes of the element.
pub const NODES: usize = 8;

/// Local places (ξ, η) of the nodes: left line upward, middle, right line upward.
pub const PLACES: [[f64; 2]; NODES] = [
    [-1.0, -1.0],
    [-1.0, 0.0],
    [-1.0, 1.0],
    [0.0, -1.0],
    [0.0, 1.0],
    [1.0, -1.0],
    [1.0, 0.0],
    [1.0, 1.0],
];

/// Points and weights of Gauss's rule of order 3 on −1 … 1.
pub const GAUSS: [(f64, f64); 3] = [
    (-0.774_596_669_241_483_4, 5.0 / 9.0),
    (0.0, 8.0 / 9.0),
    (0.774_596_669_241_483_4, 5.0 / 9.0),
];

/// Section of a ring: the rectangle `radii` × `heights`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ring {
    /// Inner and outer radius.
    pub radii: [f64; 2],
    /// Lower and upper height.
    pub heights: [f64; 2],
}

/// Lamé's constants of an isotropic material.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lame {
    /// λ = E ν / ((1 + ν)(1 − 2ν)).
    pub first: f64,
    /// μ = E / (2 (1 + ν)).
    pub shear: f64,
}

/// Stiffness; unknowns 2 n (radial) and 2 n + 1 (axial) of node n.
pub type Stiffness = [[f64; 2 * NODES]; 2 * NODES];

impl Lame {
    /// Constants for Young's modulus 1, which scales them.
    pub fn of_poisson(ratio: f64) -> Self {
        Self {
            first: ratio / ((1.0 + ratio) * (1.0 - 2.0 * ratio)),
            shear: 0.5 / (1.0 + ratio),
        }
    }
}

/// Shape function values and local derivatives at one point.
#[derive(Clone, Copy, Debug)]
struct Shapes {
    weight: f64,
    xi: f64,
    value: [f64; NODES],
    by_xi: [f64; NODES],
    by_eta: [f64; NODES],
}

static POINTS: LazyLock<Vec<Shapes>> = LazyLock::new(|| {
    let pairs = GAUSS.iter().flat_map(|x| GAUSS.iter().map(move |y| (x, y)));
    pairs
        .map(|(x, y)| Shapes::at([x.0, y.0], x.1 * y.1))
        .collect()
});

impl Shapes {
    /// Serendipity functions: products of a quadratic along one side and a line across.
    fn at([xi, eta]: [f64; 2], weight: f64) -> Self {
        let mut shapes = Self {
            weight,
            xi,
            value: [0.0; NODES],
            by_xi: [0.0; NODES],
            by_eta: [0.0; NODES],
        };
        for (node, [x, y]) in PLACES.into_iter().enumerate() {
            let (u, v) = (1.0 + xi * x, 1.0 + eta * y);
            let [value, by_xi, by_eta] = if x == 0.0 {
                [
                    0.5 * (1.0 - xi * xi) * v,
                    -xi * v,
                    0.5 * (1.0 - xi * xi) * y,
                ]
            } else if y == 0.0 {
                [
                    0.5 * (1.0 - eta * eta) * u,
                    0.5 * (1.0 - eta * eta) * x,
                    -eta * u,
                ]
            } else {
                let corner = xi * x + eta * y - 1.0;
                [
                    0.25 * u * v * corner,
                    0.25 * x * v * (corner + u),
                    0.25 * y * u * (corner + v),
                ]
            };
            shapes.value[node] = value;
            shapes.by_xi[node] = by_xi;
            shapes.by_eta[node] = by_eta;
        }
        shapes
    }
}

impl Ring {
    /// Stiffness of the whole ring, ∫ Bᵀ D B 2πr dr dz, by nine Gauss points.
    ///
    /// ```text
    /// ε_r = ∂u/∂r,  ε_θ = u/r,  ε_z = ∂w/∂z,  γ = ∂u/∂z + ∂w/∂r
    /// σ = λ (ε_r + ε_θ + ε_z) + 2μ ε,  τ = μ γ
    /// ```
    pub fn stiffness(&self, lame: Lame) -> Stiffness {
        let mut stiffness = [[0.0; 2 * NODES]; 2 * NODES];
        let half = [self.radii, self.heights].map(|[low, high]| 0.5 * (high - low));
        let middle = 0.5 * (self.radii[0] + self.radii[1]);
        for point in POINTS.iter() {
            let radius = middle + half[0] * point.xi;
            let weight = point.weight * 2.0 * PI * radius * half[0] * half[1];
            let by_r = point.by_xi.map(|slope| slope / half[0]);
            let by_z = point.by_eta.map(|slope| slope / half[1]);
            let hoop = point.value.map(|value| value / radius);
            let (first, shear) = (weight * lame.first, weight * lame.shear);
            for i in 0..NODES {
                let (ri, zi, hi) = (by_r[i], by_z[i], hoop[i]);
                for j in 0..=i {
                    let (rj, zj, hj) = (by_r[j], by_z[j], hoop[j]);
                    stiffness[2 * i][2 * j] += first * (ri + hi) * (rj + hj)
                        + shear * (2.0 * (ri * rj + hi * hj) + zi * zj);
                    stiffness[2 * i][2 * j + 1] += first * (ri + hi) * zj + shear * zi * rj;
                    stiffness[2 * i + 1][2 * j] += first * zi * (rj + hj) + shear * ri * zj;
                    stiffness[2 * i + 1][2 * j + 1] +=
                        first * zi * zj + shear * (2.0 * zi * zj + ri * rj);
                }
            }
        }
        for row in 1..2 * NODES {
            let (above, rest) = stiffness.split_at_mut(row);
            for (column, line) in above.iter_mut().enumerate() {
                line[row] = rest[0][column];
            }
        }
        stiffness
    }
}

/// ∫ ψ φ 2πr dr over an edge, by row and column: ψ the two straight hats, φ the three quadratic shape functions.
///
/// Exact: the integrand is of degree four.
pub fn edge_load([inner, outer]: [f64; 2]) -> [[f64; 3]; 2] {
    let mut load = [[0.0; 3]; 2];
    for (xi, weight) in GAUSS {
        let radius = 0.5 * (inner + outer) + 0.5 * (outer - inner) * xi;
        let ring = weight * PI * radius * (outer - inner);
        let hats = [0.5 * (1.0 - xi), 0.5 * (1.0 + xi)];
        let shapes = [0.5 * xi * (xi - 1.0), 1.0 - xi * xi, 0.5 * xi * (xi + 1.0)];
        for (row, hat) in load.iter_mut().zip(hats) {
            for (entry, shape) in row.iter_mut().zip(shapes) {
                *entry += ring * hat * shape;
            }
        }
    }
    load
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numerics::condensation::{Chain, Front};

    const RING: Ring = Ring {
        radii: [0.8, 1.3],
        heights: [-0.2, 0.5],
    };
    const LAME: Lame = Lame {
        first: 1.2,
        shear: 0.7,
    };

    /// Unknowns of a displacement field (u, w) of radius and height.
    fn sampled(field: impl Fn(f64, f64) -> [f64; 2]) -> [f64; 2 * NODES] {
        let mut unknowns = [0.0; 2 * NODES];
        for (node, [x, y]) in PLACES.into_iter().enumerate() {
            let at = |[low, high]: [f64; 2], x: f64| 0.5 * (low + high) + 0.5 * (high - low) * x;
            let [u, w] = field(at(RING.radii, x), at(RING.heights, y));
            unknowns[2 * node] = u;
            unknowns[2 * node + 1] = w;
        }
        unknowns
    }

    fn forces(unknowns: &[f64; 2 * NODES]) -> [f64; 2 * NODES] {
        RING.stiffness(LAME)
            .map(|row| row.iter().zip(unknowns).map(|(k, x)| k * x).sum())
    }

    // 1e-13: cancellation of entries of order ten.
    #[test]
    fn axial_shift_meets_no_force_and_stiffness_is_symmetric() {
        for force in forces(&sampled(|_, _| [0.0, 1.0])) {
            assert!(force.abs() < 1e-13);
        }
        let stiffness = RING.stiffness(LAME);
        for (i, row) in stiffness.iter().enumerate() {
            for (j, value) in row.iter().enumerate() {
                assert!((value - stiffness[j][i]).abs() < 1e-13);
            }
        }
    }

    // u = α r, w = β z strains the ring evenly: twice the energy is
    // [(λ + 2μ)(2α² + β²) + 2λ(α² + 2αβ)] times the volume. 1e-12: exact for the Gauss rule.
    #[test]
    fn even_strain_has_its_energy() {
        let (alpha, beta) = (0.3, -0.7);
        let unknowns = sampled(|r, z| [alpha * r, beta * z]);
        let found: f64 = forces(&unknowns)
            .iter()
            .zip(&unknowns)
            .map(|(f, x)| f * x)
            .sum();
        let volume = PI * (1.3_f64.powi(2) - 0.8_f64.powi(2)) * 0.7;
        let (first, shear) = (LAME.first, LAME.shear);
        let density = (first + 2.0 * shear) * (2.0 * alpha * alpha + beta * beta)
            + 2.0 * first * (alpha * alpha + 2.0 * alpha * beta);
        assert!((found / (density * volume) - 1.0).abs() < 1e-12, "{found}");
    }

    // u = 0, w = γ r is simple shear: twice the energy is μ γ² times the volume.
    #[test]
    fn simple_shear_has_its_energy() {
        let unknowns = sampled(|r, _| [0.0, 0.4 * r]);
        let found: f64 = forces(&unknowns)
            .iter()
            .zip(&unknowns)
            .map(|(f, x)| f * x)
            .sum();
        let volume = PI * (1.3_f64.powi(2) - 0.8_f64.powi(2)) * 0.7;
        assert!((found / (LAME.shear * 0.16 * volume) - 1.0).abs() < 1e-12);
    }

    #[test]
    fn edge_loads_add_up_to_the_area() {
        let load = edge_load([0.8, 1.3]);
        let area: f64 = load.iter().flatten().sum();
        assert!((area / (PI * (1.69 - 0.64)) - 1.0).abs() < 1e-14);
        // ∫ 2π r (r − 0.8)/0.5 dr, the share of the outer hat.
        let outer: f64 = load[1].iter().sum();
        let exact = 4.0 * PI * ((1.3_f64.powi(3) - 0.512) / 3.0 - 0.4 * (1.69 - 0.64));
        assert!((outer / exact - 1.0).abs() < 1e-13);
    }

    /// Mean radial displacement at the hole of a thick-walled cylinder under hole pressure 1, E = 1.
    fn hole_displacement([inner, outer]: [f64; 2], poisson: f64, columns: usize) -> f64 {
        const HEIGHT: f64 = 0.7;
        let chain = Chain {
            links: columns,
            interior: 4,
            line: 6,
            border: 1,
        };
        let line = |index: usize| inner + (outer - inner) * index as f64 / columns as f64;
        let fill = |link: usize, front: &mut Front| {
            let ring = Ring {
                radii: [line(link), line(link + 1)],
                heights: [0.0, HEIGHT],
            };
            let stiffness = ring.stiffness(Lame::of_poisson(poisson));
            // Node order: left line, middle, right line; the chain runs outward.
            let place = |unknown: usize| match unknown {
                0..6 => front.near(unknown),
                6..10 => front.interior(unknown - 6),
                _ => front.far(unknown - 10),
            };
            let places: Vec<usize> = (0..2 * NODES).map(place).collect();
            let held = if link == 0 { front.near(1) } else { usize::MAX };
            if link == 0 {
                front.fix(held);
                let ring = 2.0 * PI * inner * HEIGHT;
                for (node, share) in [1.0, 4.0, 1.0].into_iter().enumerate() {
                    let (row, column) = (front.border(0), front.near(2 * node));
                    front.add(row, column, ring * share / 6.0);
                }
            }
            for (i, one) in places.iter().enumerate() {
                for (j, other) in places.iter().enumerate().take(i + 1) {
                    if *one != held && *other != held {
                        front.add(*one, *other, stiffness[i][j]);
                    }
                }
            }
        };
        chain.response(fill).unwrap()[(0, 0)] / (2.0 * PI * inner * HEIGHT)
    }

    // Source: Lamé's thick-walled cylinder with free ends,
    // u(a) = a/E [(1 − ν) a² + (1 + ν) b²]/(b² − a²) at pressure 1.
    #[test]
    fn thick_cylinder_opens_as_lame_says() {
        let ([a, b], poisson) = ([0.6_f64, 2.0_f64], 0.33);
        let exact = a * ((1.0 - poisson) * a * a + (1.0 + poisson) * b * b) / (b * b - a * a);
        let errors =
            [4, 8, 16].map(|columns| hole_displacement([a, b], poisson, columns) / exact - 1.0);
        for pair in errors.windows(2) {
            let order = (pair[0] / pair[1]).log2();
            // Quadratic elements: displacement averaged over the load converges like the energy, h⁴;
            // the first pair of grids is not quite there.
            assert!((3.4..4.3).contains(&order), "{order}: {errors:?}");
        }
        // What h⁴ leaves of 6e-3 on four columns.
        assert!(errors[2].abs() < 5e-5, "{errors:?}");
    }
}
