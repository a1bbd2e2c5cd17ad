//! The coarsest level: Cholesky factor of a chain of dense blocks, one for each line of columns.

use nalgebra::DMatrix;

use crate::numerics::{
    banded::NotPositiveDefinite,
    columns::{Form, Matrix},
    inner,
};

/// Columns eliminated before the rest of a block is updated in one matrix product.
const PANEL: usize = 24;

/// The matrix and its factor, in double precision: weak springs leave a condition near 1e9.
pub(super) struct Coarsest<F> {
    pub matrix: Matrix<F, f64>,
    /// Unknowns of a column without padding.
    block: usize,
    /// Which direction the chain runs along: the longer one.
    along: usize,
    /// For every link: columns of L on its own rows and on the next link's.
    links: Vec<DMatrix<f64>>,
}

impl<F: Form> Coarsest<F> {
    pub fn new(matrix: Matrix<F, f64>, groups: &[[usize; 2]]) -> Result<Self, NotPositiveDefinite> {
        let mut coarsest = Self {
            along: usize::from(matrix.lines[1] > matrix.lines[0]),
            matrix,
            block: groups.iter().map(|group| group[1]).sum(),
            links: Vec::new(),
        };
        coarsest.refactor()?;
        Ok(coarsest)
    }

    /// Multiplications of a factor.
    pub fn cost(lines: [usize; 2], block: usize) -> f64 {
        let (short, long) = (lines[0].min(lines[1]), lines[0].max(lines[1]));
        2.33 * long as f64 * ((short * block) as f64).powi(3)
    }

    /// Length of a vector.
    pub fn length(&self) -> usize {
        self.matrix.lines[0] * self.matrix.lines[1] * self.matrix.stride
    }

    fn size(&self) -> usize {
        self.matrix.lines[1 - self.along] * self.block
    }

    /// Column at a place of a link.
    fn column(&self, link: usize, place: usize) -> usize {
        let ny = self.matrix.lines[1];
        if self.along == 0 {
            link * ny + place
        } else {
            place * ny + link
        }
    }

    /// Makes the factor from the matrix as it is.
    pub fn refactor(&mut self) -> Result<(), NotPositiveDefinite> {
        let size = self.size();
        let mut links: Vec<DMatrix<f64>> = Vec::new();
        for link in 0..self.matrix.lines[self.along] {
            let mut front = self.assembled(link);
            if let Some(before) = links.last() {
                let reach = before.rows(size, size);
                let turned = reach.transpose();
                front.rows_mut(0, size).gemm(-1.0, &reach, &turned, 1.0);
            }
            eliminate(&mut front).map_err(|row| NotPositiveDefinite {
                row: link * size + row,
            })?;
            links.push(front);
        }
        self.links = links;
        Ok(())
    }

    /// Columns of one link: its own rows above, those of the next link below.
    fn assembled(&self, link: usize) -> DMatrix<f64> {
        let (size, places) = (self.size(), self.matrix.lines[1 - self.along]);
        let mut front = DMatrix::zeros(2 * size, size);
        let last = link + 1 == self.matrix.lines[self.along];
        for place in 0..places {
            for (step, side) in [(0, 0), (0, 1), (0, 2), (1, 0), (1, 1), (1, 2)] {
                if step == 1 && last || place + side == 0 || place + side > places {
                    continue;
                }
                let other = place + side - 1;
                // Entries of the other column's equations; the matrix is symmetric.
                let neighbour = if self.along == 0 {
                    3 * (1 - step) + 2 - side
                } else {
                    3 * (2 - side) + 1 - step
                };
                let row_column = self.column(link + step, other);
                let (row, from) = (step * size + other * self.block, place * self.block);
                self.matrix.add_block(
                    (row_column, neighbour),
                    |_| true,
                    |a, b, value| front[(row + a, from + b)] += value,
                );
            }
        }
        for place in 0..places {
            let at = place * self.block;
            for held in self.matrix.held_at(self.column(link, place)) {
                front.column_mut(at + held).fill(0.0);
                front.row_mut(at + held).fill(0.0);
            }
            if !last {
                for held in self.matrix.held_at(self.column(link + 1, place)) {
                    front.row_mut(size + at + held).fill(0.0);
                }
            }
        }
        for at in 0..size {
            // Unknowns that are held or that no cell carries stay zero.
            if front[(at, at)] == 0.0 {
                front[(at, at)] = 1.0;
            }
        }
        front
    }

    /// Replaces a right-hand side by the solution.
    pub fn solve(&self, values: &mut [f64]) {
        let size = self.size();
        let mut ordered = vec![0.0; (self.links.len() + 1) * size];
        self.copy(values, &mut ordered, |value, own| {
            own.copy_from_slice(value);
        });
        for link in 0..self.links.len() {
            for place in 0..self.matrix.lines[1 - self.along] {
                for held in self.matrix.held_at(self.column(link, place)) {
                    ordered[link * size + place * self.block + held] = 0.0;
                }
            }
        }
        for (link, factor) in self.links.iter().enumerate() {
            let part = &mut ordered[link * size..][..2 * size];
            for (at, column) in factor.column_iter().enumerate() {
                let column = &column.as_slice()[at..];
                let (solved, rest) = part[at..].split_first_mut().expect("rows below");
                *solved /= column[0];
                for (value, entry) in rest.iter_mut().zip(&column[1..]) {
                    *value -= *solved * entry;
                }
            }
        }
        for value in &mut ordered[self.links.len() * size..] {
            *value = 0.0;
        }
        for (link, factor) in self.links.iter().enumerate().rev() {
            let part = &mut ordered[link * size..][..2 * size];
            for (at, column) in factor.column_iter().enumerate().rev() {
                let column = &column.as_slice()[at..];
                let (solved, rest) = part[at..].split_first_mut().expect("rows below");
                *solved = (*solved - inner::product::<4>(rest, &column[1..])) / column[0];
            }
        }
        self.copy(values, &mut ordered, |value, own| {
            value.copy_from_slice(own);
        });
    }

    /// Visits every column's part of a vector beside its place in the order of the factor.
    fn copy(
        &self,
        values: &mut [f64],
        ordered: &mut [f64],
        visit: impl Fn(&mut [f64], &mut [f64]),
    ) {
        for link in 0..self.links.len() {
            for place in 0..self.matrix.lines[1 - self.along] {
                let at = self.column(link, place) * self.matrix.stride;
                let to = link * self.size() + place * self.block;
                visit(
                    &mut values[at..at + self.block],
                    &mut ordered[to..to + self.block],
                );
            }
        }
    }
}

/// Turns the columns of a block into columns of L; `Err` names a bad pivot.
fn eliminate(front: &mut DMatrix<f64>) -> Result<(), usize> {
    let (rows, size) = front.shape();
    for start in (0..size).step_by(PANEL) {
        let end = (start + PANEL).min(size);
        for pivot in start..end {
            let value = front[(pivot, pivot)];
            if !(value > 0.0 && value.is_finite()) {
                return Err(pivot);
            }
            let scale = value.sqrt().recip();
            let (done, later) = front.as_mut_slice().split_at_mut((pivot + 1) * rows);
            let done = &mut done[pivot * rows..];
            for entry in &mut done[pivot..] {
                *entry *= scale;
            }
            for (column, rest) in (pivot + 1..end).zip(later.chunks_mut(rows)) {
                let factor = done[column];
                for (value, entry) in rest[column..].iter_mut().zip(&done[column..]) {
                    *value -= factor * entry;
                }
            }
        }
        if end < size {
            let (done, mut rest) = front.columns_range_pair_mut(start..end, end..size);
            let lower = done.rows(end, rows - end);
            let upper = done.rows(end, size - end).transpose();
            rest.rows_mut(end, rows - end)
                .gemm(-1.0, &lower, &upper, 1.0);
        }
    }
    Ok(())
}
