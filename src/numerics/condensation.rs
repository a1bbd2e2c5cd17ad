//! Elimination of a long chain of unknowns, link by link, down to a small border.

use std::ops::Range;

use nalgebra::DMatrix;

use crate::numerics::banded::NotPositiveDefinite;

/// Columns eliminated before the rest of the front is updated in one matrix product.
const PANEL: usize = 16;
/// Columns of the rest that one matrix product updates.
const STRIP: usize = 48;

/// Sizes of a chain: `links + 1` lines of unknowns, neighbours joined through an interior.
///
/// ```text
/// line 0 — interior 0 — line 1 — interior 1 — … — line n,   each may load any row of the border
/// ```
///
/// Unknowns of one link meet only each other and the border, so that the matrix is banded; the band
/// is kept as one dense front that moves along the chain.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Chain {
    /// Number of links.
    pub links: usize,
    /// Unknowns inside one link.
    pub interior: usize,
    /// Unknowns on one line between links.
    pub line: usize,
    /// Rows of the border: right-hand sides.
    pub border: usize,
}

/// The dense part of the matrix that one link fills.
#[derive(Clone, Debug)]
pub struct Front {
    chain: Chain,
    matrix: DMatrix<f64>,
    opened: usize,
}

impl Front {
    /// Place of an unknown inside the link.
    pub fn interior(&self, unknown: usize) -> usize {
        unknown
    }

    /// Place of an unknown on the line that the chain has reached.
    pub fn near(&self, unknown: usize) -> usize {
        self.chain.interior + unknown
    }

    /// Place of an unknown on the line that comes next.
    pub fn far(&self, unknown: usize) -> usize {
        self.chain.interior + self.chain.line + unknown
    }

    /// Place of a row of the border.
    pub fn border(&self, row: usize) -> usize {
        self.chain.interior + 2 * self.chain.line + row
    }

    /// Adds to the entry of two places, and to its mirror image; give each pair once.
    pub fn add(&mut self, i: usize, j: usize, value: f64) {
        let (row, column) = (i.max(j), i.min(j));
        self.matrix[(row, column)] += value;
        let first = self.border(0);
        if row >= first {
            self.opened = self.opened.max(row - first + 1);
        }
    }

    /// Gives an unknown the value zero: its own equation becomes x = 0.
    ///
    /// Nothing else may have been added, or be added, to that place.
    pub fn fix(&mut self, place: usize) {
        self.matrix[(place, place)] = 1.0;
    }

    /// Eliminates the unknowns before `count`; rows beyond the opened border are left alone.
    fn eliminate(&mut self, count: usize) -> Result<(), NotPositiveDefinite> {
        let size = self.border(self.opened);
        for start in (0..count).step_by(PANEL) {
            let end = (start + PANEL).min(count);
            for pivot in start..end {
                self.scale_column(pivot, size)?;
                self.update_panel(pivot, end, size);
            }
            self.update_rest(start..end, size);
        }
        Ok(())
    }

    fn scale_column(&mut self, pivot: usize, size: usize) -> Result<(), NotPositiveDefinite> {
        let value = self.matrix[(pivot, pivot)];
        if !(value > 0.0 && value.is_finite()) {
            return Err(NotPositiveDefinite { row: pivot });
        }
        let scale = value.sqrt().recip();
        let stride = self.matrix.nrows();
        let column = &mut self.matrix.as_mut_slice()[pivot * stride..][pivot..size];
        for entry in column {
            *entry *= scale;
        }
        Ok(())
    }

    /// Takes the panel's columns out of the lower half of all that follow, strip by strip.
    fn update_rest(&mut self, panel: Range<usize>, size: usize) {
        let mut first = panel.end;
        while first < size {
            let last = (first + STRIP).min(size);
            let (done, mut rest) = self
                .matrix
                .columns_range_pair_mut(panel.clone(), first..last);
            let lower = done.rows(first, size - first);
            let upper = done.rows(first, last - first).transpose();
            rest.rows_mut(first, size - first)
                .gemm(-1.0, &lower, &upper, 1.0);
            first = last;
        }
    }

    /// Takes the pivot's column out of the columns of its panel that follow.
    fn update_panel(&mut self, pivot: usize, end: usize, size: usize) {
        let stride = self.matrix.nrows();
        let (done, rest) = self
            .matrix
            .as_mut_slice()
            .split_at_mut((pivot + 1) * stride);
        let done = &done[pivot * stride..];
        for column in pivot + 1..end {
            let factor = done[column];
            let target = &mut rest[(column - pivot - 1) * stride..][column..size];
            for (entry, above) in target.iter_mut().zip(&done[column..size]) {
                *entry -= factor * above;
            }
        }
    }

    /// Moves on by one link: the far line becomes the near one, the rest of the link is cleared.
    ///
    /// Only the lower half of the front is ever read.
    fn advance(&mut self) {
        let size = self.border(self.opened);
        let (near, far, stride) = (self.near(0), self.far(0), self.matrix.nrows());
        let (line, border) = (self.chain.line, self.border(0));
        let slice = self.matrix.as_mut_slice();
        for column in 0..line {
            let (old, new) = ((far + column) * stride, (near + column) * stride);
            slice.copy_within(old + far + column..old + border, new + near + column);
            slice[new + far..new + border].fill(0.0);
            slice.copy_within(old + border..old + size, new + border);
        }
        slice[..near * stride].fill(0.0);
        slice[far * stride..border * stride].fill(0.0);
    }
}

impl Chain {
    /// The response Bᵀ K⁻¹ B of the border, K the matrix of the chain, B its loads.
    ///
    /// `fill` adds the matrix and the loads of one link to an empty front. The bordered matrix
    ///
    /// ```text
    /// | K   B |   loses K by Cholesky elimination and keeps −Bᵀ K⁻¹ B in the corner,
    /// | Bᵀ  0 |   so that no displacement is ever formed and no back substitution done.
    /// ```
    ///
    /// Border rows cost nothing before the first link that loads them: number them in that order.
    /// Error: the pivot's place in its front.
    pub fn response(
        self,
        mut fill: impl FnMut(usize, &mut Front),
    ) -> Result<DMatrix<f64>, NotPositiveDefinite> {
        let size = self.interior + 2 * self.line + self.border;
        let mut front = Front {
            chain: self,
            matrix: DMatrix::zeros(size, size),
            opened: 0,
        };
        for link in 0..self.links {
            fill(link, &mut front);
            front.eliminate(front.far(0))?;
            front.advance();
        }
        // The last line stands in the near place; the other places are empty.
        for unknown in 0..self.interior {
            front.fix(unknown);
        }
        for unknown in 0..self.line {
            front.fix(front.far(unknown));
        }
        front.eliminate(front.border(0))?;
        let first = front.border(0);
        let mut response = -front
            .matrix
            .view((first, first), (self.border, self.border))
            .into_owned();
        response.fill_upper_triangle_with_lower_triangle();
        Ok(response)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const CHAIN: Chain = Chain {
        links: 4,
        interior: 3,
        line: 17,
        border: 3,
    };

    /// Entry of a diagonally dominant pattern between two unknowns of one link.
    fn entry(i: usize, j: usize) -> f64 {
        let coupling = ((i * 7 + j * 13) % 11) as f64 / 11.0 - 0.5;
        if i == j { 40.0 } else { coupling }
    }

    /// Global number of a place of a link, lines and interiors in turn.
    fn number(link: usize, place: usize) -> usize {
        let first = link * (CHAIN.line + CHAIN.interior);
        if place < CHAIN.interior {
            first + CHAIN.line + place
        } else if place < CHAIN.interior + CHAIN.line {
            first + place - CHAIN.interior
        } else {
            first + place
        }
    }

    // 1e-13: a dense factorisation of the same, well conditioned matrix; only roundings differ.
    #[test]
    fn response_is_that_of_the_whole_matrix() {
        let size = CHAIN.interior + 2 * CHAIN.line;
        let order = CHAIN.links * (CHAIN.line + CHAIN.interior) + CHAIN.line;
        let mut matrix = DMatrix::<f64>::zeros(order, order);
        let mut loads = DMatrix::<f64>::zeros(order, CHAIN.border);
        let found = CHAIN
            .response(|link, front| {
                for i in 0..size {
                    for j in 0..=i {
                        front.add(i, j, entry(i, j));
                        let (row, column) = (number(link, i), number(link, j));
                        matrix[(row, column)] += entry(i, j);
                        if i != j {
                            matrix[(column, row)] += entry(i, j);
                        }
                    }
                }
                // The third load acts on the last link alone, the second from the second on.
                for row in 0..CHAIN.border {
                    if link >= row + usize::from(row == 2) {
                        let places = [
                            front.near(row),
                            front.interior(1),
                            front.far(2),
                            front.far(16),
                        ];
                        for (step, place) in places.into_iter().enumerate() {
                            let value = 1.0 + step as f64 * 0.3 - row as f64;
                            front.add(front.border(row), place, value);
                            loads[(number(link, place), row)] += value;
                        }
                    }
                }
            })
            .unwrap();
        let solved = matrix.cholesky().unwrap().solve(&loads);
        let wanted: DMatrix<f64> = loads.tr_mul(&solved);
        let off: DMatrix<f64> = found - wanted;
        assert!(off.amax() < 1e-13);
    }

    #[test]
    fn a_loose_chain_is_refused() {
        let chain = Chain {
            links: 2,
            interior: 0,
            line: 1,
            border: 1,
        };
        let spring = |_: usize, front: &mut Front| {
            front.add(0, 0, 1.0);
            front.add(1, 1, 1.0);
            front.add(1, 0, -1.0);
            front.add(front.border(0), 0, 1.0);
        };
        assert!(chain.response(spring).is_err());
    }
}
