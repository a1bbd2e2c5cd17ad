//! Symmetric positive definite band matrices: Cholesky factor and solution.

use crate::numerics::inner;

/// A symmetric band matrix; only the lower half is kept.
///
/// Row `i` stores columns `i − w … i`, `w` the half-bandwidth, so that the inner products of the
/// factorisation run over contiguous memory.
#[derive(Clone, Debug, PartialEq)]
pub struct BandedMatrix {
    order: usize,
    half_bandwidth: usize,
    rows: Vec<f64>,
}

/// The matrix is not positive definite: a pivot was zero, negative or not a number.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("the matrix is not positive definite: pivot {row} is not above zero")]
pub struct NotPositiveDefinite {
    /// Row of the pivot.
    pub row: usize,
}

/// The lower Cholesky factor of a [`BandedMatrix`].
#[derive(Clone, Debug, PartialEq)]
pub struct Factor {
    lower: BandedMatrix,
    inverse_diagonal: Vec<f64>,
}

impl BandedMatrix {
    /// Zeros, with `half_bandwidth` diagonals below the main one.
    pub fn new(order: usize, half_bandwidth: usize) -> Self {
        Self {
            order,
            half_bandwidth,
            rows: vec![0.0; order * (half_bandwidth + 1)],
        }
    }

    /// Number of rows.
    pub fn order(&self) -> usize {
        self.order
    }

    /// Adds `value` to the entry at row `i`, column `j`, and to its mirror image.
    ///
    /// Give each pair once, in either order; a diagonal entry once.
    ///
    /// # Panics
    /// When the entry lies outside the matrix or its band.
    pub fn add(&mut self, i: usize, j: usize, value: f64) {
        let (row, column) = (i.max(j), i.min(j));
        assert!(
            row < self.order && row - column <= self.half_bandwidth,
            "entry ({i}, {j}) lies outside the band"
        );
        let place = self.place(row, column);
        self.rows[place] += value;
    }

    /// The entry at row `i`, column `j`; zero outside the band.
    pub fn entry(&self, i: usize, j: usize) -> f64 {
        let (row, column) = (i.max(j), i.min(j));
        if row < self.order && row - column <= self.half_bandwidth {
            self.rows[self.place(row, column)]
        } else {
            0.0
        }
    }

    /// The product with a vector.
    pub fn times(&self, vector: &[f64]) -> Vec<f64> {
        let mut product = vec![0.0; self.order];
        for row in 0..self.order {
            let first = row.saturating_sub(self.half_bandwidth);
            for column in first..row {
                let value = self.rows[self.place(row, column)];
                product[row] += value * vector[column];
                product[column] += value * vector[row];
            }
            product[row] += self.rows[self.place(row, row)] * vector[row];
        }
        product
    }

    /// Cholesky factor L with L Lᵀ = A; n w² multiplications.
    pub fn factor(mut self) -> Result<Factor, NotPositiveDefinite> {
        let stride = self.half_bandwidth + 1;
        let mut inverse_diagonal = vec![0.0; self.order];
        for row in 0..self.order {
            let first = row.saturating_sub(self.half_bandwidth);
            let (finished, rest) = self.rows.split_at_mut(row * stride);
            let current = &mut rest[..stride];
            for column in first..row {
                // Columns that both rows hold: from the left end of the longer reach to `column`.
                let length = column - first;
                let above = &finished[column * stride..][self.half_bandwidth - length..];
                let start = self.half_bandwidth - (row - first);
                let overlap =
                    inner::product::<8>(&current[start..start + length], &above[..length]);
                let place = self.half_bandwidth - (row - column);
                current[place] = (current[place] - overlap) * inverse_diagonal[column];
            }
            let left = &current[self.half_bandwidth - (row - first)..self.half_bandwidth];
            let pivot = current[self.half_bandwidth] - inner::product::<8>(left, left);
            if !(pivot > 0.0 && pivot.is_finite()) {
                return Err(NotPositiveDefinite { row });
            }
            current[self.half_bandwidth] = pivot.sqrt();
            inverse_diagonal[row] = pivot.sqrt().recip();
        }
        Ok(Factor {
            lower: self,
            inverse_diagonal,
        })
    }

    fn place(&self, row: usize, column: usize) -> usize {
        row * (self.half_bandwidth + 1) + self.half_bandwidth - (row - column)
    }
}

impl Factor {
    /// Replaces the right-hand side by the solution.
    ///
    /// # Panics
    /// When the right-hand side is shorter than the matrix.
    pub fn solve(&self, rhs: &mut [f64]) {
        self.forward(rhs, 0);
        self.backward(rhs);
    }

    /// Replaces a right-hand side b by L⁻¹ b; entries before `start` must be zero.
    ///
    /// # Panics
    /// When the right-hand side is shorter than the matrix.
    pub fn forward(&self, rhs: &mut [f64], start: usize) {
        let width = self.lower.half_bandwidth;
        let stride = width + 1;
        for row in start..self.lower.order {
            let first = row.saturating_sub(width).max(start);
            let left = &self.lower.rows[row * stride + width - (row - first)..][..row - first];
            rhs[row] = (rhs[row] - inner::product::<8>(left, &rhs[first..row]))
                * self.inverse_diagonal[row];
        }
    }

    /// Replaces a right-hand side b by L⁻ᵀ b.
    ///
    /// # Panics
    /// When the right-hand side is shorter than the matrix.
    pub fn backward(&self, rhs: &mut [f64]) {
        let width = self.lower.half_bandwidth;
        let stride = width + 1;
        for row in (0..self.lower.order).rev() {
            let first = row.saturating_sub(width);
            let solved = rhs[row] * self.inverse_diagonal[row];
            rhs[row] = solved;
            let left = &self.lower.rows[row * stride + width - (row - first)..][..row - first];
            for (value, entry) in rhs[first..row].iter_mut().zip(left) {
                *value -= entry * solved;
            }
        }
    }

    /// Number of rows.
    pub fn order(&self) -> usize {
        self.lower.order
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A diagonally dominant matrix with an irregular pattern inside its band.
    fn example(order: usize, half_bandwidth: usize) -> BandedMatrix {
        let mut matrix = BandedMatrix::new(order, half_bandwidth);
        for row in 0..order {
            for column in row.saturating_sub(half_bandwidth)..row {
                let value = ((row * 7 + column * 13) % 11) as f64 / 11.0 - 0.5;
                matrix.add(column, row, value);
            }
            matrix.add(row, row, half_bandwidth as f64 + 1.0);
        }
        matrix
    }

    // 1e-12: condition below 100, so a few hundred roundings at most.
    #[test]
    fn solution_satisfies_the_equations() {
        for (order, half_bandwidth) in [(1, 0), (5, 0), (7, 2), (60, 9), (60, 23), (9, 20)] {
            let matrix = example(order, half_bandwidth);
            let wanted: Vec<f64> = (0..order).map(|row| (row as f64).sin() + 0.3).collect();
            let mut found = matrix.times(&wanted);
            matrix
                .factor()
                .expect("diagonally dominant")
                .solve(&mut found);
            for (found, wanted) in found.iter().zip(&wanted) {
                assert!((found - wanted).abs() < 1e-12, "{order} {half_bandwidth}");
            }
        }
    }

    // −u″ = 1 on five inner points: u = x (1 − x)/2 exactly, differences being exact for quadratics.
    #[test]
    fn second_differences_give_the_parabola() {
        let mut matrix = BandedMatrix::new(5, 1);
        for row in 0..5 {
            matrix.add(row, row, 2.0);
            if row > 0 {
                matrix.add(row, row - 1, -1.0);
            }
        }
        let mut u = vec![1.0 / 36.0; 5];
        matrix.factor().expect("positive definite").solve(&mut u);
        for (row, u) in u.iter().enumerate() {
            let x = (row + 1) as f64 / 6.0;
            assert!((u - x * (1.0 - x) / 2.0).abs() < 1e-15);
        }
    }

    #[test]
    fn indefinite_matrix_names_its_row() {
        let mut matrix = example(6, 2);
        matrix.add(4, 4, -20.0);
        assert_eq!(matrix.factor(), Err(NotPositiveDefinite { row: 4 }));
        let mut matrix = example(6, 2);
        matrix.add(3, 2, f64::NAN);
        assert_eq!(matrix.factor(), Err(NotPositiveDefinite { row: 3 }));
    }

    #[test]
    fn entries_mirror_and_add_up() {
        let mut matrix = BandedMatrix::new(4, 2);
        matrix.add(1, 3, 2.0);
        matrix.add(3, 1, 0.5);
        assert_eq!(
            (matrix.entry(1, 3), matrix.entry(3, 1), matrix.entry(0, 3)),
            (2.5, 2.5, 0.0)
        );
    }

    #[test]
    #[should_panic(expected = "outside the band")]
    fn entry_outside_the_band_is_refused() {
        BandedMatrix::new(5, 1).add(4, 0, 1.0);
    }
}
