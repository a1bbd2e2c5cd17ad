//! Quadratic ring element of rectangular section for axisymmetric linear elasticity.

use std::{f64::consts::PI, sync::LazyLock};

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
                for j in 0..NODES {
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
        stiffness
    }
}

/// ∫ ψ_p φ_q 2πr dr over an edge: ψ the two straight hats, φ the three quadratic shape functions.
///
/// Exact: the integrand is of degree four.
pub fn edge_load([inner, outer]: [f64; 2]) -> [[f64; 3]; 2] {
    let mut load = [[0.0; 3]; 2];
    for (xi, weight) in GAUSS {
        let radius = 0.5 * (inner + outer) + 0.5 * (outer - inner) * xi;
        let ring = weight * PI * radius * (outer - inner);
        let hats = [0.5 * (1.0 - xi), 0.5 * (1.0 + xi)];
        let shapes = [
            0.5 * xi * (xi - 1.0),
            1.0 - xi * xi,
            0.5 * xi * (xi + 1.0),
        ];
        for (row, hat) in load.iter_mut().zip(hats) {
            for (entry, shape) in row.iter_mut().zip(shapes) {
                *entry += ring * hat * shape;
            }
        }
    }
    load
}
