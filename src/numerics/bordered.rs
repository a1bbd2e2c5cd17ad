//! A banded matrix with a dense border, condensed to the border and solved for what lies inside.

use nalgebra::DMatrix;

use crate::numerics::banded::{BandedMatrix, Factor, NotPositiveDefinite};

/// One column of the border: rows inside and their values; equal rows add up.
pub type Column = Vec<(usize, f64)>;

/// Columns that one matrix product takes.
const STRIP: usize = 24;

/// The matrix after elimination of its inside.
///
/// ```text
/// | K   B |        K = L Lᵀ,  Y = L⁻¹ B
/// | Bᵀ  C |        C − Bᵀ K⁻¹ B = C − Yᵀ Y
/// ```
#[derive(Clone, Debug)]
pub struct Bordered {
    factor: Factor,
    half_solved: DMatrix<f64>,
    /// C − Bᵀ K⁻¹ B.
    pub reduced: DMatrix<f64>,
}

impl Bordered {
    /// Eliminates the inside `matrix` K; `border` are the columns of B, `corner` is C, of which
    /// the upper half is read.
    ///
    /// # Panics
    /// When a row of the border lies outside the matrix, or the corner is not as wide as the border.
    pub fn new(
        matrix: BandedMatrix,
        border: &[Column],
        mut corner: DMatrix<f64>,
    ) -> Result<Self, NotPositiveDefinite> {
        let factor = matrix.factor()?;
        let order = factor.order();
        let mut half_solved = DMatrix::zeros(order, border.len());
        let columns = half_solved.as_mut_slice().chunks_exact_mut(order.max(1));
        let first_rows: Vec<usize> = border
            .iter()
            .map(|entries| entries.iter().map(|(row, _)| *row).min().unwrap_or(order))
            .collect();
        for ((column, entries), first) in columns.zip(border).zip(&first_rows) {
            for (row, value) in entries {
                column[*row] += value;
            }
            factor.forward(column, *first);
        }
        subtract_square(&mut corner, &half_solved, &first_rows);
        Ok(Self {
            factor,
            half_solved,
            reduced: corner,
        })
    }

    /// K⁻¹ B a for the amplitudes a of the columns of the border.
    ///
    /// # Panics
    /// When there are more amplitudes than columns.
    pub fn inside(&self, amplitudes: &[f64]) -> Vec<f64> {
        let order = self.factor.order();
        let mut sum = vec![0.0; order];
        let columns = self.half_solved.as_slice().chunks_exact(order.max(1));
        for (column, amplitude) in columns.zip(amplitudes) {
            if *amplitude == 0.0 {
                continue;
            }
            for (entry, value) in sum.iter_mut().zip(column) {
                *entry += amplitude * value;
            }
        }
        self.factor.backward(&mut sum);
        sum
    }

    /// Unknowns inside.
    pub fn order(&self) -> usize {
        self.factor.order()
    }
}

/// Takes Yᵀ Y out of a matrix, strip by strip, rows above the first of both strips left out.
fn subtract_square(corner: &mut DMatrix<f64>, columns: &DMatrix<f64>, first_rows: &[usize]) {
    let (order, count) = columns.shape();
    let starts: Vec<usize> = first_rows
        .chunks(STRIP)
        .map(|rows| rows.iter().copied().min().unwrap_or(order))
        .collect();
    for (one, start) in starts.iter().enumerate() {
        let strip = one * STRIP..((one + 1) * STRIP).min(count);
        let left = columns.columns_range(strip.clone()).transpose();
        for (other, other_start) in starts.iter().enumerate().skip(one) {
            let first = *start.max(other_start);
            if first >= order {
                continue;
            }
            let across = other * STRIP..((other + 1) * STRIP).min(count);
            let right = columns.columns_range(across.clone());
            let right = right.rows(first, order - first);
            let mut target = corner.view_range_mut(strip.clone(), across);
            let left = left.columns(first, order - first);
            target.gemm(-1.0, &left, &right, 1.0);
        }
    }
    corner.fill_lower_triangle_with_upper_triangle();
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A chain of springs with two loads, and the same matrix in full.
    fn example() -> (BandedMatrix, Vec<Column>, DMatrix<f64>) {
        const ORDER: usize = 9;
        let mut banded = BandedMatrix::new(ORDER, 2);
        let mut full = DMatrix::zeros(ORDER, ORDER);
        for row in 0..ORDER {
            banded.add(row, row, 5.0);
            full[(row, row)] += 5.0;
            for back in 1..=2.min(row) {
                let value = 0.7 * back as f64 - 1.4;
                banded.add(row, row - back, value);
                full[(row, row - back)] += value;
                full[(row - back, row)] += value;
            }
        }
        let border = vec![vec![(3, 1.0), (4, -2.0), (3, 0.5)], vec![], vec![(8, 1.0)]];
        (banded, border, full)
    }

    // 1e-14: rounding of a well conditioned matrix of order nine.
    #[test]
    fn border_and_inside_are_those_of_the_full_matrix() {
        let (banded, border, full) = example();
        let mut loads = DMatrix::zeros(full.nrows(), border.len());
        for (column, entries) in border.iter().enumerate() {
            for (row, value) in entries {
                loads[(*row, column)] += value;
            }
        }
        let corner = DMatrix::from_fn(3, 3, |i, j| (i + j) as f64);
        let found = Bordered::new(banded, &border, corner.clone()).unwrap();
        let solved: DMatrix<f64> = full.lu().solve(&loads).unwrap();
        let wanted: DMatrix<f64> = corner - loads.transpose() * &solved;
        let off: DMatrix<f64> = wanted - &found.reduced;
        assert!(off.amax() < 1e-14);
        let amplitudes = [0.3, 7.0, -1.2];
        for (row, value) in found.inside(&amplitudes).iter().enumerate() {
            let wanted: f64 = (0..3).map(|k| solved[(row, k)] * amplitudes[k]).sum();
            assert!((value - wanted).abs() < 1e-14, "{row}");
        }
    }

    #[test]
    fn a_matrix_without_floor_is_refused() {
        let loose = BandedMatrix::new(2, 1);
        assert!(Bordered::new(loose, &[], DMatrix::zeros(0, 0)).is_err());
    }
}
