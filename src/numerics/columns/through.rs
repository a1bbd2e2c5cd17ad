//! Polynomials through the thickness: Lagrange on Gauss–Lobatto nodes, degree one to three.

use crate::numerics::{columns::Square, quadrature::gauss_legendre};

/// Matrices of one element through the thickness; rows and columns beyond its nodes are zero.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Element {
    /// Number of nodes, degree + 1.
    pub nodes: usize,
    /// Height.
    pub height: f64,
    /// `∫ Z_a Z_b dz`.
    pub mass: Square,
    /// `∫ Z_a′ Z_b′ dz`.
    pub slope: Square,
    /// `∫ Z_a Z_b′ dz`.
    pub mixed: Square,
}

/// Nodes of an element on [−1, 1]; the outer two are its faces.
fn reference_nodes(degree: usize) -> Vec<f64> {
    let inner = 0.2_f64.sqrt();
    match degree {
        1 => vec![-1.0, 1.0],
        2 => vec![-1.0, 0.0, 1.0],
        _ => vec![-1.0, -inner, inner, 1.0],
    }
}

impl Element {
    /// The element of a height and a degree, 1 to 3.
    pub fn new(height: f64, degree: usize) -> Self {
        let nodes = reference_nodes(degree);
        let mut element = Self {
            nodes: nodes.len(),
            height,
            mass: [[0.0; 4]; 4],
            slope: [[0.0; 4]; 4],
            mixed: [[0.0; 4]; 4],
        };
        for (at, weight) in gauss_legendre(degree + 2) {
            let (values, slopes) = lagrange(&nodes, at);
            let (half, by_z) = (0.5 * height, 2.0 / height);
            for a in 0..nodes.len() {
                for b in 0..nodes.len() {
                    element.mass[a][b] += weight * half * values[a] * values[b];
                    element.slope[a][b] += weight * by_z * slopes[a] * slopes[b];
                    element.mixed[a][b] += weight * values[a] * slopes[b];
                }
            }
        }
        element
    }
}

/// Values and slopes of the Lagrange polynomials at a point of [−1, 1].
fn lagrange(nodes: &[f64], at: f64) -> ([f64; 4], [f64; 4]) {
    let (mut values, mut slopes) = ([0.0; 4], [0.0; 4]);
    for (a, node) in nodes.iter().enumerate() {
        let others = || nodes.iter().enumerate().filter(move |(b, _)| *b != a);
        values[a] = others()
            .map(|(_, other)| (at - other) / (node - other))
            .product();
        slopes[a] = others()
            .map(|(skipped, skip)| {
                let rest: f64 = others()
                    .filter(|(b, _)| *b != skipped)
                    .map(|(_, other)| (at - other) / (node - other))
                    .product();
                rest / (node - skip)
            })
            .sum();
    }
    (values, slopes)
}

/// Integral of every Lagrange polynomial of a stack of elements over a span of heights.
///
/// Heights count from the foot of the first element; parts of the span off the stack are left out.
pub fn span_loads(heights: &[f64], degree: usize, span: [f64; 2]) -> Vec<f64> {
    let nodes = reference_nodes(degree);
    let mut loads = vec![0.0; heights.len() * degree + 1];
    let mut foot = 0.0;
    for (element, height) in heights.iter().enumerate() {
        let (low, high) = (span[0].max(foot), span[1].min(foot + height));
        if low < high {
            for (at, weight) in gauss_legendre(degree + 1) {
                let z = 0.5 * (low + high) + 0.5 * (high - low) * at;
                let (values, _) = lagrange(&nodes, 2.0 * (z - foot) / height - 1.0);
                for (a, value) in values[..=degree].iter().enumerate() {
                    loads[element * degree + a] += 0.5 * (high - low) * weight * value;
                }
            }
        }
        foot += height;
    }
    loads
}

/// Heights of the nodes of a stack of elements above its foot.
pub fn node_heights(heights: &[f64], degree: usize) -> Vec<f64> {
    let mut nodes = vec![0.0];
    let mut foot = 0.0;
    for height in heights {
        let inner = reference_nodes(degree).into_iter().skip(1);
        nodes.extend(inner.map(|at| foot + 0.5 * height * (at + 1.0)));
        foot += height;
    }
    nodes
}
