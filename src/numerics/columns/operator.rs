//! The equations of a whole plan: layers, ties and conductors put together.

use rayon::prelude::*;

use crate::numerics::{
    columns::{
        Element, Form, LANES, Matrix, Neighbour, Plan,
        kernel::{Coupling, Slab, turned},
        stencil::{coefficients, with_floor},
    },
    inner,
};

/// A bonded layer of a body.
#[derive(Clone, Debug)]
pub struct Layer<'a, F> {
    /// Share of every cell that it fills, 0 to 1, as [`Region::shares`](crate::numerics::columns::Region::shares) gives it.
    pub shares: &'a [f64],
    /// Group of the body.
    pub group: usize,
    /// Node of the body that is its lowest.
    pub first_node: usize,
    /// Heights of its elements, upwards.
    pub heights: &'a [f64],
    /// Degree of the elements, 1 to 3.
    pub degree: usize,
    /// Material.
    pub constants: F,
}

/// A coupling in every column: stencil ⊗ e eᵀ with e = 1 at `plus` and −1 at `minus`.
///
/// Springs and resistances between two groups have a [`lumped`](crate::numerics::columns::lumped)
/// stencil; films and membranes on one unknown a full one. A stencil must be symmetric and not negative.
#[derive(Clone, Debug, PartialEq)]
pub struct Tie {
    /// Unknown of the column that counts positive.
    pub plus: usize,
    /// Unknown that counts negative, in another group; none ties to the ground.
    pub minus: Option<usize>,
    /// Nine neighbours of every column.
    pub stencil: Vec<[f64; 9]>,
}

/// A term of rank one: strength · v vᵀ, felt by the equations but not by the preconditioner.
#[derive(Clone, Debug, PartialEq)]
pub struct Conductor {
    /// Places of the vector with their values.
    pub entries: Vec<(usize, f64)>,
    /// Factor.
    pub strength: f64,
}

/// Symmetric positive semidefinite equations on the columns of a plan.
#[derive(Clone, Debug)]
pub struct Operator<F> {
    pub(crate) plan: Plan,
    pub(crate) matrix: Matrix<F, f64>,
    /// First unknown and number of unknowns of every group.
    pub(crate) groups: Vec<[usize; 2]>,
    /// Terms of rank one.
    pub conductors: Vec<Conductor>,
}

impl<F: Form> Operator<F> {
    /// No equations yet, for groups of so many unknowns: components times nodes of a body, or 1 for a
    /// loose unknown.
    pub fn new(plan: &Plan, groups: &[usize]) -> Self {
        let mut first = 0;
        let ranges = groups
            .iter()
            .map(|count| {
                first += count;
                [first - count, *count]
            })
            .collect();
        Self {
            plan: plan.clone(),
            matrix: Matrix {
                lines: [plan.x.len(), plan.y.len()],
                stride: first,
                slabs: Vec::new(),
                sets: Vec::new(),
                couplings: Vec::new(),
                held: [Vec::new(), Vec::new()],
                form: std::marker::PhantomData,
            },
            groups: ranges,
            conductors: Vec::new(),
        }
    }

    /// The plan.
    pub fn plan(&self) -> &Plan {
        &self.plan
    }

    /// First unknown and number of unknowns of every group.
    pub fn ranges(&self) -> &[[usize; 2]] {
        &self.groups
    }

    /// Number of unknowns, padding not counted.
    pub fn unknowns(&self) -> usize {
        self.plan.columns() * self.groups.iter().map(|group| group[1]).sum::<usize>()
    }

    /// A vector of zeros with room for the padding.
    pub fn zeros(&self) -> Vec<f64> {
        vec![0.0; self.plan.columns() * self.matrix.stride]
    }

    /// Unknown of a column: group, component and node of the body; 0, 0 for a loose one.
    pub fn unknown(&self, group: usize, component: usize, node: usize) -> usize {
        let [first, count] = self.groups[group];
        first + component * (count / F::COMPONENTS) + node
    }

    /// Place of a column's unknown in a vector.
    pub fn place(&self, column: usize, unknown: usize) -> usize {
        column * self.matrix.stride + unknown
    }

    /// Adds a layer; all layers before the first vector is made.
    pub fn add_layer(&mut self, layer: &Layer<F>) {
        let shares = with_floor(&self.plan, layer.shares);
        let set = self.matrix.sets.len();
        self.matrix
            .sets
            .push(coefficients(&self.plan, &shares, layer.constants));
        let step = self.groups[layer.group][1] / F::COMPONENTS;
        for (index, height) in layer.heights.iter().enumerate() {
            let element = Element::new(*height, layer.degree);
            self.matrix.slabs.push(Slab {
                first: self.unknown(layer.group, 0, layer.first_node + index * layer.degree),
                step,
                nodes: element.nodes,
                set,
                through: turned(&layer.constants.through(&element)),
            });
        }
        // The kernel reads whole registers, beyond the last node of a column's last element.
        let unknowns: usize = self.groups.iter().map(|group| group[1]).sum();
        let spare = LANES - (layer.degree + 1);
        let needed = (unknowns + spare).next_multiple_of(2);
        self.matrix.stride = self.matrix.stride.max(needed);
    }

    /// Adds a tie and returns its index.
    pub fn add_tie(&mut self, tie: Tie) -> usize {
        self.matrix.couplings.push(Coupling {
            plus: tie.plus,
            minus: tie.minus,
            stencil: tie.stencil,
        });
        self.matrix.couplings.len() - 1
    }

    /// Gives a tie another lumped stencil.
    pub fn set_tie(&mut self, tie: usize, weights: &[f64]) {
        let rows = self.matrix.couplings[tie].stencil.iter_mut();
        for (row, weight) in rows.zip(weights) {
            row[4] = *weight;
        }
    }

    /// Holds unknowns at zero on the last line across an axis, 0 for x and 1 for y: displacements across
    /// a mirror that stands there. Loads and start values there must be zero.
    pub fn hold(&mut self, axis: usize, unknowns: impl IntoIterator<Item = usize>) {
        self.matrix.held[axis].extend(unknowns);
    }

    /// Puts a vector to zero where unknowns are held.
    pub fn clear_held(&self, values: &mut [f64]) {
        for column in 0..self.plan.columns() {
            for unknown in self.matrix.held_at(column) {
                values[column * self.matrix.stride + unknown] = 0.0;
            }
        }
    }

    /// Both unknowns that a tie joins; twice the same where it holds to the ground.
    pub fn ends(&self, tie: usize) -> [usize; 2] {
        let coupling = &self.matrix.couplings[tie];
        [coupling.plus, coupling.minus.unwrap_or(coupling.plus)]
    }

    /// The matrix times `values`, into `image`.
    pub fn product(&self, values: &[f64], image: &mut [f64]) {
        let [nx, ny] = self.matrix.lines;
        let stride = self.matrix.stride;
        let row_length = ny * stride;
        image
            .par_chunks_mut(row_length)
            .enumerate()
            .for_each(|(i, row)| {
                row.fill(0.0);
                for j in 0..ny {
                    let mut neighbours: [Neighbour<f64>; 9] = [(0, &[]); 9];
                    let mut count = 0;
                    for di in usize::from(i == 0)..3 - usize::from(i + 1 == nx) {
                        for dj in usize::from(j == 0)..3 - usize::from(j + 1 == ny) {
                            let at = ((i + di - 1) * ny + j + dj - 1) * stride;
                            neighbours[count] = (3 * di + dj, &values[at..at + stride]);
                            count += 1;
                        }
                    }
                    self.matrix.add_products(
                        i * ny + j,
                        &neighbours[..count],
                        &mut row[j * stride..][..stride],
                    );
                    for unknown in self.matrix.held_at(i * ny + j) {
                        row[j * stride + unknown] = 0.0;
                    }
                }
            });
        for conductor in &self.conductors {
            let entries = &conductor.entries;
            let difference: f64 = entries.iter().map(|(at, v)| v * values[*at]).sum();
            for (at, v) in entries {
                image[*at] += conductor.strength * difference * v;
            }
        }
    }

    /// Inner product, summed row by row so that it does not depend on the number of threads.
    pub fn dot(&self, a: &[f64], b: &[f64]) -> f64 {
        let length = self.matrix.lines[1] * self.matrix.stride;
        let rows: Vec<f64> = a
            .par_chunks(length)
            .zip(b.par_chunks(length))
            .with_min_len(8)
            .map(|(a, b)| inner::product::<4>(a, b))
            .collect();
        rows.iter().sum()
    }
}
