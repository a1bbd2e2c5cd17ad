//! Inverse blocks of whole columns: groups inverted apart, ties between them added by a small matrix.

use rayon::prelude::*;

use crate::numerics::{
    banded::NotPositiveDefinite,
    columns::{Coupling, Form, Matrix},
};

/// Numbers in one register.
const LANES: usize = 4;

/// Inverses of the diagonal blocks of all columns.
///
/// ```text
/// D = D₀ + B diag(d) Bᵀ     D₀ falls into groups, B has a column e₊ − e₋ for every tie between two
/// D⁻¹ r = y − D₀⁻¹ B S⁻¹ Bᵀ y,   y = D₀⁻¹ r,   S = diag(1/d) + Bᵀ D₀⁻¹ B
/// ```
///
/// D₀ stays when ties change. Unknowns that are held or without any equation get the value 0.
#[derive(Clone, Debug)]
pub(super) struct Blocks {
    groups: Vec<Group>,
    /// Numbers of all groups of one column.
    width: usize,
    inverse: Vec<f32>,
    ties: Vec<Between>,
    /// S⁻¹ of every column; zero where a tie is slack.
    small: Vec<f32>,
    tied: Vec<bool>,
}

/// One group: where its unknowns and its numbers begin, and how long a padded row is.
#[derive(Clone, Copy, Debug)]
struct Group {
    first: usize,
    count: usize,
    offset: usize,
    row: usize,
}

/// A tie between two groups: which coupling, which groups and places inside them.
#[derive(Clone, Copy, Debug)]
struct Between {
    coupling: usize,
    ends: [(usize, usize); 2],
}

impl Blocks {
    pub fn new<F: Form>(
        matrix: &Matrix<F, f64>,
        ranges: &[[usize; 2]],
    ) -> Result<Self, NotPositiveDefinite> {
        let mut width = 0;
        let groups: Vec<Group> = ranges
            .iter()
            .map(|[first, count]| {
                let row = count.next_multiple_of(LANES);
                width += count * row;
                Group {
                    first: *first,
                    count: *count,
                    offset: width - count * row,
                    row,
                }
            })
            .collect();
        let group_of = |unknown: usize| {
            groups
                .iter()
                .position(|group| (group.first..group.first + group.count).contains(&unknown))
                .unwrap_or(0)
        };
        let between = |coupling: &Coupling<f64>| {
            let minus = coupling.minus?;
            let ends = [coupling.plus, minus].map(|unknown| {
                let group = group_of(unknown);
                (group, unknown - groups[group].first)
            });
            (ends[0].0 != ends[1].0).then_some(ends)
        };
        let ties = matrix
            .couplings
            .iter()
            .enumerate()
            .filter_map(|(coupling, tie)| between(tie).map(|ends| Between { coupling, ends }))
            .collect();
        let columns = matrix.lines[0] * matrix.lines[1];
        let mut inverse = vec![0.0; columns * width];
        inverse
            .par_chunks_mut(width)
            .with_min_len(16)
            .enumerate()
            .try_for_each(|(column, own)| {
                let size = matrix.stride;
                let mut block = vec![0.0; size * size];
                matrix.add_block(
                    (column, 4),
                    |coupling| between(coupling).is_none(),
                    |row, from, value| block[row * size + from] += value,
                );
                for held in matrix.held_at(column) {
                    for other in 0..size {
                        block[held * size + other] = 0.0;
                        block[other * size + held] = 0.0;
                    }
                }
                for group in &groups {
                    invert((&block, size), group, &mut own[group.offset..]).map_err(|row| {
                        NotPositiveDefinite {
                            row: column * size + row,
                        }
                    })?;
                }
                Ok(())
            })?;
        let mut blocks = Self {
            groups,
            width,
            inverse,
            ties,
            small: Vec::new(),
            tied: vec![false; columns],
        };
        blocks.renew(&matrix.couplings);
        Ok(blocks)
    }

    /// Takes over the strengths of the ties between groups.
    pub fn renew(&mut self, couplings: &[Coupling<f64>]) {
        let count = self.ties.len();
        if count == 0 {
            return;
        }
        let columns = self.tied.len();
        let mut small = vec![0.0; columns * count * count];
        let mut tied = vec![false; columns];
        small
            .par_chunks_mut(count * count)
            .zip(tied.par_iter_mut())
            .with_min_len(64)
            .enumerate()
            .for_each(|(column, (small, tied))| {
                *tied = self.small_inverse(column, couplings, small);
            });
        self.small = small;
        self.tied = tied;
    }

    /// S⁻¹ of one column; false where all ties are slack.
    fn small_inverse(&self, column: usize, couplings: &[Coupling<f64>], small: &mut [f32]) -> bool {
        let strength = |tie: &Between| couplings[tie.coupling].stencil[column][4];
        let taut: Vec<usize> = (0..self.ties.len())
            .filter(|tie| strength(&self.ties[*tie]) > 0.0)
            .collect();
        if taut.is_empty() {
            return false;
        }
        let size = taut.len();
        let mut matrix = vec![0.0; size * size];
        for (row, one) in taut.iter().enumerate() {
            for (place, other) in taut.iter().enumerate() {
                matrix[row * size + place] = self.compliance(column, *one, *other);
            }
            matrix[row * size + row] += strength(&self.ties[*one]).recip();
        }
        let Some(inverse) = inverse(&matrix, size) else {
            return false;
        };
        for (row, one) in taut.iter().enumerate() {
            for (place, other) in taut.iter().enumerate() {
                small[one * self.ties.len() + other] = inverse[row * size + place] as f32;
            }
        }
        true
    }

    /// Entry of Bᵀ D₀⁻¹ B for two ties.
    fn compliance(&self, column: usize, one: usize, other: usize) -> f64 {
        let mut sum = 0.0;
        for (sign, (group, row)) in [1.0, -1.0].into_iter().zip(self.ties[one].ends) {
            for (turn, (second, place)) in [1.0, -1.0].into_iter().zip(self.ties[other].ends) {
                if group == second {
                    sum += sign * turn * f64::from(self.row(column, group, row)[place]);
                }
            }
        }
        sum
    }

    fn row(&self, column: usize, group: usize, row: usize) -> &[f32] {
        let group = &self.groups[group];
        &self.inverse[column * self.width + group.offset + row * group.row..][..group.row]
    }

    /// The solution of one column's own equations.
    ///
    /// `forces` is room for the forces of the ties.
    pub fn solve(
        &self,
        column: usize,
        (rhs, forces): (&[f32], &mut Vec<f32>),
        solution: &mut [f32],
    ) {
        let own = &self.inverse[column * self.width..][..self.width];
        for group in &self.groups {
            let numbers = &own[group.offset..][..group.count * group.row];
            let range = group.first..group.first + group.count;
            multiply(numbers, &rhs[range.clone()], &mut solution[range]);
        }
        if self.tied[column] {
            self.correct(column, forces, solution);
        }
    }

    /// Takes what the ties hold out of the solution of the groups apart.
    fn correct(&self, column: usize, forces: &mut Vec<f32>, solution: &mut [f32]) {
        let count = self.ties.len();
        let at = |(group, place): (usize, usize)| self.groups[group].first + place;
        let opening = |tie: &Between| solution[at(tie.ends[0])] - solution[at(tie.ends[1])];
        // Forces of the ties; all are needed before the solution changes.
        forces.clear();
        forces.extend((0..count).map(|one| {
            let row = &self.small[(column * count + one) * count..][..count];
            let taut = row
                .iter()
                .zip(&self.ties)
                .filter(|(entry, _)| **entry != 0.0);
            taut.map(|(entry, tie)| entry * opening(tie)).sum::<f32>()
        }));
        for (tie, force) in self.ties.iter().zip(forces) {
            if *force == 0.0 {
                continue;
            }
            for (sign, (group, place)) in [1.0, -1.0].into_iter().zip(tie.ends) {
                let row = self.row(column, group, place);
                let Group { first, count, .. } = self.groups[group];
                for (value, entry) in solution[first..first + count].iter_mut().zip(row) {
                    *value -= sign * *force * entry;
                }
            }
        }
    }
}

/// Product of a symmetric matrix with padded rows and a vector.
fn multiply(matrix: &[f32], vector: &[f32], product: &mut [f32]) {
    match vector.len().div_ceil(LANES) {
        1 => multiply_in::<1>(matrix, vector, product),
        2 => multiply_in::<2>(matrix, vector, product),
        3 => multiply_in::<3>(matrix, vector, product),
        4 => multiply_in::<4>(matrix, vector, product),
        5 => multiply_in::<5>(matrix, vector, product),
        6 => multiply_in::<6>(matrix, vector, product),
        _ => {
            product.fill(0.0);
            let row = vector.len().next_multiple_of(LANES);
            for (value, row) in vector.iter().zip(matrix.chunks_exact(row)) {
                for (sum, entry) in product.iter_mut().zip(row) {
                    *sum += value * entry;
                }
            }
        }
    }
}

fn multiply_in<const REGISTERS: usize>(matrix: &[f32], vector: &[f32], product: &mut [f32]) {
    let mut sums = [[0.0_f32; LANES]; REGISTERS];
    for (value, row) in vector.iter().zip(matrix.chunks_exact(REGISTERS * LANES)) {
        for (sum, entries) in sums.iter_mut().zip(row.as_chunks::<LANES>().0) {
            for (sum, entry) in sum.iter_mut().zip(entries) {
                *sum += value * entry;
            }
        }
    }
    for (product, sum) in product.iter_mut().zip(sums.as_flattened()) {
        *product = *sum;
    }
}

/// Puts the inverse of a group's part of a block into padded rows; `Err` names a bad pivot.
fn invert((block, size): (&[f64], usize), group: &Group, into: &mut [f32]) -> Result<(), usize> {
    let count = group.count;
    let entry = |row: usize, from: usize| block[(group.first + row) * size + group.first + from];
    // Unknowns that no cell carries have an empty row.
    let live: Vec<usize> = (0..count).filter(|at| entry(*at, *at) != 0.0).collect();
    let mut matrix = vec![0.0; live.len() * live.len()];
    for (row, one) in live.iter().enumerate() {
        for (place, other) in live.iter().enumerate() {
            matrix[row * live.len() + place] = entry(*one, *other);
        }
    }
    let inverse = inverse(&matrix, live.len()).ok_or(group.first)?;
    for (row, one) in live.iter().enumerate() {
        for (place, other) in live.iter().enumerate() {
            into[one * group.row + other] = inverse[row * live.len() + place] as f32;
        }
    }
    Ok(())
}

/// Inverse of a symmetric positive definite matrix through its Cholesky factor; none where a pivot
/// is not above zero.
fn inverse(matrix: &[f64], size: usize) -> Option<Vec<f64>> {
    // Rows of L and of its inverse, both lower triangles.
    let mut lower = matrix.to_vec();
    let mut turned = vec![0.0; size * size];
    for row in 0..size {
        for column in 0..row {
            let (done, rest) = lower.split_at(row * size);
            let above = &done[column * size..][..column];
            let overlap: f64 = rest[..column].iter().zip(above).map(|(a, b)| a * b).sum();
            lower[row * size + column] =
                (lower[row * size + column] - overlap) * turned[column * size + column];
        }
        let own = &lower[row * size..][..row];
        let pivot = lower[row * size + row] - own.iter().map(|a| a * a).sum::<f64>();
        if !(pivot > 0.0 && pivot.is_finite()) {
            return None;
        }
        let scale = pivot.sqrt().recip();
        // Row of L⁻¹: −scale · (row of L) · (rows of L⁻¹ above).
        let (above, rest) = turned.split_at_mut(row * size);
        for (at, factor) in own.iter().enumerate() {
            for (sum, entry) in rest.iter_mut().zip(&above[at * size..][..=at]) {
                *sum -= scale * factor * entry;
            }
        }
        rest[row] = scale;
    }
    let mut inverse = vec![0.0; size * size];
    for row in 0..size {
        let own = &turned[row * size..][..=row];
        for (i, factor) in own.iter().enumerate() {
            for (sum, entry) in inverse[i * size..].iter_mut().zip(own) {
                *sum += factor * entry;
            }
        }
    }
    Some(inverse)
}
