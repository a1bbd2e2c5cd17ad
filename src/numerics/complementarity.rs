//! Convex quadratic programmes with unknowns that must not be negative: primal-dual active set.

use std::collections::BTreeSet;

use nalgebra::{DMatrix, DVector};

/// What decides whether an unknown may differ from zero.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bound {
    /// x ≥ 0, residual ≥ 0, one of them zero.
    NotNegative,
    /// Free where another unknown is positive, zero where that one is zero.
    With(usize),
}

/// Unknowns whose weighted sum is given; the multiplier δ of that sum is an unknown too.
#[derive(Clone, Debug, PartialEq)]
pub struct Sum {
    /// Weight of every unknown.
    pub weight: DVector<f64>,
    /// Value of the weighted sum.
    pub total: f64,
}

/// Find x, δ with
///
/// ```text
/// y = A x + g + Σ m_k δ_k,   x ≥ 0,  y ≥ 0,  x y = 0,   m_kᵀ x = total_k
/// ```
#[derive(Clone, Debug)]
pub struct Programme {
    /// A, symmetric positive definite.
    pub matrix: DMatrix<f64>,
    /// g.
    pub offset: DVector<f64>,
    /// Bound of every unknown.
    pub bounds: Vec<Bound>,
    /// The given sums.
    pub sums: Vec<Sum>,
}

/// The solution of a [`Programme`].
#[derive(Clone, Debug)]
pub struct Optimum {
    /// x.
    pub unknowns: DVector<f64>,
    /// y.
    pub residual: DVector<f64>,
    /// Which unknowns are not held at zero.
    pub active: Vec<bool>,
    /// Systems solved.
    pub iterations: usize,
}

/// The active set did not settle; carries iterations and the number of violated bounds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Unsettled {
    /// Systems solved.
    pub iterations: usize,
    /// Bounds still violated.
    pub violated: usize,
}

/// Systems after which the active set counts as unsettled.
const MOST_SYSTEMS: usize = 100;
/// Residual below zero, relative to the largest one, that is rounding.
const ROUNDING: f64 = 1e-12;

impl Programme {
    /// Solves from a first guess of the active set.
    ///
    /// Each round solves the equations of the active unknowns, then drops negative unknowns and
    /// takes in negative residuals, all at once. Once a set comes back, unknowns that go with
    /// others stay as they are and bounds change one by one, the last violated first. The answer
    /// satisfies every bound up to rounding; after a return, an unknown that goes with another may
    /// have stayed behind it.
    pub fn solve(&self, mut active: Vec<bool>) -> Result<Optimum, Unsettled> {
        self.follow(&mut active);
        let mut seen: BTreeSet<Vec<bool>> = BTreeSet::new();
        let mut returned = false;
        let mut left = 0;
        for iterations in 1..=MOST_SYSTEMS {
            let Some((unknowns, residual)) = self.equations(&active) else {
                break;
            };
            let violated = self.violated(&active, &unknowns, &residual);
            if violated.is_empty() {
                return Ok(Optimum {
                    unknowns,
                    residual,
                    active,
                    iterations,
                });
            }
            left = violated.len();
            returned = returned || !seen.insert(active.clone());
            let changed = if returned {
                &violated[left - 1..]
            } else {
                &violated[..]
            };
            for place in changed {
                active[*place] = !active[*place];
            }
            if !returned {
                self.follow(&mut active);
            }
        }
        Err(Unsettled {
            iterations: MOST_SYSTEMS,
            violated: left,
        })
    }

    /// Places whose bound is violated: negative where active, negative residual where not.
    fn violated(
        &self,
        active: &[bool],
        unknowns: &DVector<f64>,
        residual: &DVector<f64>,
    ) -> Vec<usize> {
        let rounding = ROUNDING * residual.amax();
        (0..active.len())
            .filter(|place| self.bounds[*place] == Bound::NotNegative)
            .filter(|place| {
                // Not a number counts as violated.
                let kept = if active[*place] {
                    unknowns[*place] >= 0.0
                } else {
                    residual[*place] >= -rounding
                };
                !kept
            })
            .collect()
    }

    /// Sets the unknowns that go with another one as that one is.
    fn follow(&self, active: &mut [bool]) {
        for (place, bound) in self.bounds.iter().enumerate() {
            if let Bound::With(leader) = bound {
                active[place] = active[*leader];
            }
        }
    }

    /// Unknowns and residual with the residual zero on the active set; none when singular.
    fn equations(&self, active: &[bool]) -> Option<(DVector<f64>, DVector<f64>)> {
        let set: Vec<usize> = (0..active.len()).filter(|place| active[*place]).collect();
        let count = self.sums.len();
        let factor = self
            .matrix
            .select_rows(&set)
            .select_columns(&set)
            .cholesky()?;
        // Columns: the offset, then the weights.
        let mut right = DMatrix::zeros(set.len(), 1 + count);
        for (row, place) in set.iter().enumerate() {
            right[(row, 0)] = self.offset[*place];
            for (column, sum) in self.sums.iter().enumerate() {
                right[(row, 1 + column)] = sum.weight[*place];
            }
        }
        let solved = factor.solve(&right);
        let weights = right.columns(1, count);
        let coupling = weights.tr_mul(&solved.columns(1, count));
        let mut missing = -weights.tr_mul(&solved.column(0));
        for (row, sum) in self.sums.iter().enumerate() {
            missing[row] -= sum.total;
        }
        let shift = coupling.cholesky()?.solve(&missing);
        let reduced = -(solved.column(0) + solved.columns(1, count) * &shift);
        let mut unknowns = DVector::zeros(active.len());
        for (row, place) in set.iter().enumerate() {
            unknowns[*place] = reduced[row];
        }
        let mut residual = &self.matrix * &unknowns + &self.offset;
        for (sum, shift) in self.sums.iter().zip(shift.iter()) {
            residual.axpy(*shift, &sum.weight, 1.0);
        }
        Some((unknowns, residual))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Unknowns on a line that repel each other over a short distance and feel a slope.
    fn programme(count: usize) -> Programme {
        let place = |i: usize| i as f64 / count as f64;
        let matrix = DMatrix::from_fn(count, count, |i, j| {
            (-4.0 * (place(i) - place(j)).abs()).exp()
        });
        Programme {
            matrix,
            offset: DVector::from_fn(count, |i, _| 3.0 * (place(i) - 0.4).powi(2)),
            bounds: vec![Bound::NotNegative; count],
            sums: vec![Sum {
                weight: DVector::from_element(count, 1.0),
                total: 0.8,
            }],
        }
    }

    // Enumeration of all active sets finds the one that satisfies every bound: it must be the same.
    #[test]
    fn the_set_is_the_one_that_enumeration_finds() {
        let programme = programme(9);
        let found = programme.solve(vec![true; 9]).unwrap();
        let mut good = Vec::new();
        for code in 1_u32..1 << 9 {
            let active: Vec<bool> = (0..9).map(|place| code >> place & 1 == 1).collect();
            let (unknowns, residual) = programme.equations(&active).unwrap();
            if programme.violated(&active, &unknowns, &residual).is_empty() {
                good.push(active);
            }
        }
        assert_eq!(good.len(), 1);
        assert_eq!(good[0], found.active);
        assert!(found.active.contains(&false) && found.active.contains(&true));
        // Rounding of a sum of nine.
        assert!((found.unknowns.sum() - 0.8).abs() < 1e-14);
        for place in 0..9 {
            let product = found.unknowns[place] * found.residual[place];
            assert!(product.abs() < 1e-14, "{product}");
        }
    }

    #[test]
    fn the_first_guess_does_not_matter() {
        let programme = programme(40);
        let all = programme.solve(vec![true; 40]).unwrap();
        let mut one = vec![false; 40];
        one[39] = true;
        let other = programme.solve(one).unwrap();
        assert_eq!(all.active, other.active);
    }

    #[test]
    fn a_follower_is_zero_with_its_leader() {
        let mut programme = programme(9);
        // The last unknown is free, but only beside the first one, which the slope pushes away.
        programme.bounds[8] = Bound::With(0);
        programme.sums[0].weight[8] = 0.0;
        programme.offset[0] = 10.0;
        let found = programme.solve(vec![true; 9]).unwrap();
        assert!(!found.active[0] && !found.active[8]);
        assert!(found.unknowns[8].abs() < f64::MIN_POSITIVE);
    }

    #[test]
    fn no_number_means_no_answer() {
        let mut programme = programme(5);
        programme.offset[2] = f64::NAN;
        assert!(programme.solve(vec![true; 5]).is_err());
    }
}
