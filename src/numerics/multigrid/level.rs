//! One level of the cycle: Gauss–Seidel over whole columns in four colours.

use rayon::prelude::*;

use crate::numerics::{
    banded::NotPositiveDefinite,
    columns::{Coupling, Form, Matrix, Neighbour},
    multigrid::{blocks::Blocks, coarsening::Transfer},
};

/// Columns below which a level is not worth a second thread.
const SMALL: usize = 300;

/// A level above the coarsest.
///
/// Vectors keep even rows first, odd rows after, so that one colour can change while the other is
/// read. Colours: row and place in the row, each even or odd; a row is one task.
pub(super) struct Level<F> {
    matrix: Matrix<F, f32>,
    blocks: Blocks,
    pub transfer: Transfer,
    order: Vec<usize>,
}

/// Which neighbours of a column count; never the column itself.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Reach {
    None,
    Sides,
    Rows,
    All,
}

/// Even or odd rows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Rows {
    Even,
    Odd,
}

/// The rows before and after one row, where there are any.
type Beside<'a> = [Option<&'a [f32]>; 2];

impl<F: Form> Level<F> {
    pub fn new(
        fine: &Matrix<F, f64>,
        groups: &[[usize; 2]],
        transfer: Transfer,
    ) -> Result<Self, NotPositiveDefinite> {
        let rows = fine.lines[0];
        let even = rows.div_ceil(2);
        Ok(Self {
            matrix: fine.converted(|value| value as f32),
            blocks: Blocks::new(fine, groups)?,
            transfer,
            order: (0..rows).map(|i| i / 2 + (i % 2) * even).collect(),
        })
    }

    /// Takes over the couplings between groups.
    pub fn renew(&mut self, couplings: &[Coupling<f64>]) {
        for (own, new) in self.matrix.couplings.iter_mut().zip(couplings) {
            *own = new.converted(|value| value as f32);
        }
        self.blocks.renew(couplings);
    }

    pub fn columns(&self) -> usize {
        self.matrix.lines[0] * self.matrix.lines[1]
    }

    pub fn row_length(&self) -> usize {
        self.matrix.lines[1] * self.matrix.stride
    }

    /// Place of every row in this level's vectors.
    pub fn row_order(&self) -> &[usize] {
        &self.order
    }

    /// Rows that one task takes at least.
    fn rows_together(&self) -> usize {
        if self.columns() < SMALL {
            self.matrix.lines[0]
        } else {
            1
        }
    }

    /// Forward sweep from zero.
    pub fn first_sweep(&self, b: &[f32], x: &mut [f32]) {
        self.sweep(Rows::Even, [(0, Reach::None), (1, Reach::Sides)], b, x);
        self.sweep(Rows::Odd, [(0, Reach::Rows), (1, Reach::All)], b, x);
    }

    /// Backward sweep from what is there.
    pub fn last_sweep(&self, b: &[f32], x: &mut [f32]) {
        self.sweep(Rows::Odd, [(1, Reach::All), (0, Reach::All)], b, x);
        self.sweep(Rows::Even, [(1, Reach::All), (0, Reach::All)], b, x);
    }

    /// Solves the columns of one row parity, those at the places of both parities in turn.
    fn sweep(&self, rows: Rows, turns: [(usize, Reach); 2], b: &[f32], x: &mut [f32]) {
        let length = self.row_length();
        let even = self.matrix.lines[0].div_ceil(2) * length;
        let (first, second) = x.split_at_mut(even);
        let (own, other, b) = match rows {
            Rows::Even => (first, &*second, &b[..even]),
            Rows::Odd => (second, &*first, &b[even..]),
        };
        own.par_chunks_mut(length)
            .zip(b.par_chunks(length))
            .enumerate()
            .with_min_len(self.rows_together())
            .for_each(|(index, (row, b))| {
                self.sweep_row((rows, index), turns, (b, other), row);
            });
    }

    fn sweep_row(
        &self,
        (rows, index): (Rows, usize),
        turns: [(usize, Reach); 2],
        (b, other): (&[f32], &[f32]),
        row: &mut [f32],
    ) {
        let stride = self.matrix.stride;
        let (line, beside) = beside(rows, index, other, self.row_length());
        let (mut sum, mut forces) = (vec![0.0; stride], Vec::new());
        for (parity, reach) in turns {
            for j in (parity..self.matrix.lines[1]).step_by(2) {
                sum.fill(0.0);
                self.add_neighbours((line, j), reach, (row, beside), &mut sum);
                for (sum, b) in sum.iter_mut().zip(&b[j * stride..]) {
                    *sum = b - *sum;
                }
                let column = line * self.matrix.lines[1] + j;
                let own = &mut row[j * stride..][..stride];
                self.blocks.solve(column, (&sum, &mut forces), own);
            }
        }
    }

    /// Adds to `sum` what the neighbours within reach contribute to a column.
    fn add_neighbours<'a>(
        &self,
        (line, j): (usize, usize),
        reach: Reach,
        (own, beside): (&'a [f32], Beside<'a>),
        sum: &mut [f32],
    ) {
        let (ny, stride) = (self.matrix.lines[1], self.matrix.stride);
        let mut neighbours: [Neighbour<f32>; 8] = [(0, &[]); 8];
        let mut count = 0;
        let mut take = |row: &'a [f32], neighbour: usize, at: usize| {
            neighbours[count] = (neighbour, &row[at * stride..][..stride]);
            count += 1;
        };
        if matches!(reach, Reach::Sides | Reach::All) {
            if j > 0 {
                take(own, 3, j - 1);
            }
            if j + 1 < ny {
                take(own, 5, j + 1);
            }
        }
        if matches!(reach, Reach::Rows | Reach::All) {
            for (side, row) in beside.into_iter().enumerate() {
                let Some(row) = row else { continue };
                for dj in usize::from(j == 0)..3 - usize::from(j + 1 == ny) {
                    take(row, 6 * side + dj, j + dj - 1);
                }
            }
        }
        let column = line * ny + j;
        self.matrix.add_products(column, &neighbours[..count], sum);
    }

    /// What the forward sweep has left of the right-hand side, brought to the coarser level.
    ///
    /// Each column solved its own equation with what stood there then; left is what later colours
    /// changed since.
    pub fn restrict(&self, x: &[f32], order: &[usize], coarse: &mut [f32]) {
        let length = self.row_length();
        let even = self.matrix.lines[0].div_ceil(2) * length;
        let (first, second) = x.split_at(even);
        let mut left = vec![0.0; x.len()];
        let (left_even, left_odd) = left.split_at_mut(even);
        let sides = [
            (Rows::Even, left_even, first, second),
            (Rows::Odd, left_odd, second, first),
        ];
        for (rows, left, own, other) in sides {
            let reaches = match rows {
                Rows::Even => [Reach::All, Reach::Rows],
                Rows::Odd => [Reach::Sides, Reach::None],
            };
            left.par_chunks_mut(length)
                .zip(own.par_chunks(length))
                .enumerate()
                .with_min_len(self.rows_together())
                .for_each(|(index, (left, row))| {
                    let (line, beside) = beside(rows, index, other, length);
                    for (j, left) in left.chunks_mut(self.matrix.stride).enumerate() {
                        let reach = reaches[j % 2];
                        if reach != Reach::None {
                            self.add_neighbours((line, j), reach, (row, beside), left);
                        }
                    }
                });
        }
        self.gather(&left, order, coarse);
    }

    /// −Pᵀ times a vector.
    fn gather(&self, left: &[f32], order: &[usize], coarse: &mut [f32]) {
        let [x, y] = &self.transfer.axes;
        let (stride, length) = (self.matrix.stride, self.row_length());
        let coarse_length = y.kept.len() * stride;
        let mut line_at = vec![0; order.len()];
        for (line, slot) in order.iter().enumerate() {
            line_at[*slot] = line;
        }
        coarse
            .par_chunks_mut(coarse_length)
            .enumerate()
            .with_min_len(self.rows_together())
            .for_each(|(slot, row)| {
                row.fill(0.0);
                for (k, wx) in &x.children[line_at[slot]] {
                    let fine = &left[self.order[*k] * length..][..length];
                    for (j, sum) in row.chunks_mut(stride).enumerate() {
                        for (l, wy) in &y.children[j] {
                            let weight = (wx * wy) as f32;
                            for (sum, value) in sum.iter_mut().zip(&fine[l * stride..]) {
                                *sum -= weight * value;
                            }
                        }
                    }
                }
            });
    }

    /// Adds P times the coarser solution.
    pub fn prolong(&self, coarse: &[f32], order: &[usize], x: &mut [f32]) {
        let axes = &self.transfer.axes;
        let (stride, length) = (self.matrix.stride, self.row_length());
        let coarse_length = axes[1].kept.len() * stride;
        let mut line_at = vec![0; self.order.len()];
        for (line, slot) in self.order.iter().enumerate() {
            line_at[*slot] = line;
        }
        x.par_chunks_mut(length)
            .enumerate()
            .with_min_len(self.rows_together())
            .for_each(|(slot, row)| {
                for (i, wx) in axes[0].parents[line_at[slot]] {
                    if wx == 0.0 {
                        continue;
                    }
                    let from = &coarse[order[i] * coarse_length..][..coarse_length];
                    for (value, parents) in row.chunks_mut(stride).zip(&axes[1].parents) {
                        for (j, wy) in parents {
                            let weight = (wx * wy) as f32;
                            if weight > 0.0 {
                                for (value, add) in value.iter_mut().zip(&from[j * stride..]) {
                                    *value += weight * add;
                                }
                            }
                        }
                    }
                }
            });
    }
}

/// Line of a row and the rows beside it, which all have the other parity.
fn beside(rows: Rows, index: usize, other: &[f32], length: usize) -> (usize, Beside<'_>) {
    let row = |at: Option<usize>| at.and_then(|at| other.get(at * length..(at + 1) * length));
    match rows {
        Rows::Even => (2 * index, [row(index.checked_sub(1)), row(Some(index))]),
        Rows::Odd => (2 * index + 1, [row(Some(index)), row(Some(index + 1))]),
    }
}
