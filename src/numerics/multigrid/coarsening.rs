//! Which lines a coarser level keeps, and what its matrix is.

use rayon::prelude::*;

use crate::numerics::columns::{Coupling, Form, Matrix};

/// Lines of one direction, fine and coarse.
#[derive(Clone, Debug)]
pub(super) struct Axis {
    /// Index of every kept line.
    pub kept: Vec<usize>,
    /// The two coarse lines around every fine line, with their weights.
    pub parents: Vec<[(usize, f64); 2]>,
    /// Fine lines that each coarse line feeds, with their weights.
    pub children: Vec<Vec<(usize, f64)>>,
    /// For every coarse line: fine line, its neighbour 0..3, coarse neighbour 0..3 and weight.
    products: Vec<Vec<(usize, usize, usize, f64)>>,
}

/// From one level to the next.
#[derive(Clone, Debug)]
pub(super) struct Transfer {
    /// Across x and across y.
    pub axes: [Axis; 2],
}

impl Axis {
    fn new(lines: &[f64], widest: f64) -> Self {
        let last = lines.len() - 1;
        let mut kept = vec![0];
        let mut at = 0;
        while at < last {
            let wide = at + 2 <= last && lines[at + 2] - lines[at] <= widest;
            at += if wide { 2 } else { 1 };
            kept.push(at);
        }
        let mut parents = vec![[(0, 0.0); 2]; lines.len()];
        for (coarse, pair) in kept.windows(2).enumerate() {
            for fine in pair[0]..=pair[1] {
                let along = (lines[fine] - lines[pair[0]]) / (lines[pair[1]] - lines[pair[0]]);
                parents[fine] = [(coarse, 1.0 - along), (coarse + 1, along)];
            }
        }
        let mut children = vec![Vec::new(); kept.len()];
        for (fine, pair) in parents.iter().enumerate() {
            for (coarse, weight) in pair {
                if *weight > 0.0 {
                    children[*coarse].push((fine, *weight));
                }
            }
        }
        let mut axis = Self {
            kept,
            parents,
            children,
            products: Vec::new(),
        };
        axis.products = (0..axis.kept.len())
            .map(|coarse| axis.products_of(coarse))
            .collect();
        axis
    }

    fn products_of(&self, coarse: usize) -> Vec<(usize, usize, usize, f64)> {
        let mut products = Vec::new();
        for (fine, weight) in &self.children[coarse] {
            for neighbour in 0..3 {
                let Some(other) = (fine + neighbour).checked_sub(1) else {
                    continue;
                };
                for (parent, share) in self.parents.get(other).into_iter().flatten() {
                    // A fine line's neighbour never lies beyond the coarse line's own neighbour.
                    if *share > 0.0 {
                        products.push((*fine, neighbour, parent + 1 - coarse, weight * share));
                    }
                }
            }
        }
        products
    }
}

impl Transfer {
    pub fn new(lines: &[Vec<f64>; 2], widest: f64) -> Self {
        Self {
            axes: [Axis::new(&lines[0], widest), Axis::new(&lines[1], widest)],
        }
    }

    /// Columns of the coarser level.
    pub fn columns(&self) -> usize {
        self.axes[0].kept.len() * self.axes[1].kept.len()
    }

    pub fn kept_lines(&self, lines: &[Vec<f64>; 2]) -> [Vec<f64>; 2] {
        [0, 1].map(|axis| {
            self.axes[axis]
                .kept
                .iter()
                .map(|at| lines[axis][*at])
                .collect()
        })
    }

    /// The coarser matrix Pᵀ A P.
    pub fn coarse<F: Form>(&self, fine: &Matrix<F, f64>) -> Matrix<F, f64> {
        Matrix {
            lines: [self.axes[0].kept.len(), self.axes[1].kept.len()],
            stride: fine.stride,
            slabs: fine.slabs.clone(),
            sets: fine
                .sets
                .iter()
                .map(|set| self.coarse_stencils(set, F::STENCILS))
                .collect(),
            couplings: fine
                .couplings
                .iter()
                .map(|coupling| coarse_coupling(coupling, self))
                .collect(),
            held: fine.held.clone(),
            form: std::marker::PhantomData,
        }
    }

    /// Pᵀ S P for stencils of `width` numbers for each neighbour of each column.
    fn coarse_stencils(&self, fine: &[f64], width: usize) -> Vec<f64> {
        let [x, y] = &self.axes;
        let (fine_ny, ny) = (y.parents.len(), y.kept.len());
        let mut coarse = vec![0.0; self.columns() * 9 * width];
        coarse
            .par_chunks_mut(ny * 9 * width)
            .enumerate()
            .for_each(|(i, row)| {
                for (j, own) in row.chunks_mut(9 * width).enumerate() {
                    for (k, dk, di, wx) in &x.products[i] {
                        for (l, dl, dj, wy) in &y.products[j] {
                            let from = ((k * fine_ny + l) * 9 + 3 * dk + dl) * width;
                            let into = &mut own[(3 * di + dj) * width..][..width];
                            for (into, from) in into.iter_mut().zip(&fine[from..from + width]) {
                                *into += wx * wy * from;
                            }
                        }
                    }
                }
            });
        coarse
    }
}

pub(super) fn coarse_coupling(coupling: &Coupling<f64>, transfer: &Transfer) -> Coupling<f64> {
    let flat: Vec<f64> = coupling.stencil.iter().flatten().copied().collect();
    let coarse = transfer.coarse_stencils(&flat, 1);
    Coupling {
        plus: coupling.plus,
        minus: coupling.minus,
        stencil: coarse
            .chunks_exact(9)
            .map(|row| std::array::from_fn(|at| row[at]))
            .collect(),
    }
}
