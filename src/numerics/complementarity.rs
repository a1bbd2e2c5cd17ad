//! Convex quadratic programmes with unknowns that must not be negative: primal-dual active set.

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
const MOST_SYSTEMS: usize = 60;
/// Residual below zero, relative to the largest one, that is rounding.
const ROUNDING: f64 = 1e-12;

impl Programme {
    /// Solves from a first guess of the active set.
    ///
    /// Each round solves the equations of the active unknowns, then drops negative unknowns and
    /// takes in negative residuals, all at once. Converges in finitely many rounds where it
    /// converges; the answer satisfies every bound exactly up to rounding.
    pub fn solve(&self, mut active: Vec<bool>) -> Result<Optimum, Unsettled> {
        let mut violated = usize::MAX;
        for iterations in 1..=MOST_SYSTEMS {
            let Some((unknowns, residual)) = self.equations(&active) else {
                break;
            };
            let rounding = ROUNDING * residual.amax();
            let mut next = active.clone();
            violated = 0;
            for (place, bound) in self.bounds.iter().enumerate() {
                if *bound == Bound::NotNegative {
                    let wrong = if active[place] {
                        // False for NaN as well, which then counts as violated.
                        !(unknowns[place] >= 0.0)
                    } else {
                        !(residual[place] >= -rounding)
                    };
                    violated += usize::from(wrong);
                    next[place] = active[place] != wrong;
                }
            }
            self.follow(&mut next);
            if violated == 0 {
                return Ok(Optimum {
                    unknowns,
                    residual,
                    active,
                    iterations,
                });
            }
            active = next;
        }
        Err(Unsettled {
            iterations: MOST_SYSTEMS,
            violated,
        })
    }

    /// Sets the unknowns that go with another one as that one is.
    pub fn follow(&self, active: &mut [bool]) {
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
