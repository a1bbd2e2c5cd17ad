//! Conjugate gradients on columns, guided by one multigrid cycle over whole columns.
//!
//! ```text
//! level 0        all lines           four-colour Gauss–Seidel, one whole column at a time, forward
//! level 1        every second line   … and so on, while the merged spacing allows
//! coarsest       few lines           Cholesky factor of the whole matrix
//!                                    … and back up, Gauss–Seidel in reverse order
//! ```
//!
//! Coarse matrices are Pᵀ A P with bilinear P in the plan and the identity through the thickness, so
//! that every one of them keeps the product form. The cycle works in single precision but for the
//! coarsest factor: it only guides, the equations themselves are double.

mod blocks;
mod coarsening;
mod coarsest;
mod gradients;
mod level;

pub use gradients::{Effort, Solved, Stalled, conjugate_gradients};

use coarsening::{Transfer, coarse_coupling};
use coarsest::Coarsest;
use level::Level;

use crate::numerics::{
    banded::NotPositiveDefinite,
    columns::{Form, Matrix, Operator},
};

/// How far lines are dropped.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Coarsening {
    /// Widest spacing that dropping a line may leave; wider ones come only where the coarsest factor
    /// would cost more than `dearest`.
    pub widest: f64,
    /// Multiplications of the coarsest factor below which no more lines are dropped.
    pub cheap: f64,
    /// Multiplications of the coarsest factor above which the widest spacing gives way.
    pub dearest: f64,
}

impl Coarsening {
    /// Down to the cheapest factor, for equations that do not mind wide cells.
    pub const FULL: Self = Self {
        widest: f64::INFINITY,
        cheap: 3e5,
        dearest: f64::INFINITY,
    };
}

/// Whether the coarsest factor follows a change of ties.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Factor {
    /// It is made anew.
    Renewed,
    /// It stays, for small changes: the cycle guides a little worse.
    Kept,
}

/// The levels of one operator.
pub struct Multigrid<F> {
    levels: Vec<Level<F>>,
    coarsest: Coarsest<F>,
    spaces: Vec<Space>,
}

/// Vectors of one level: what is sought, what is asked for.
#[derive(Default)]
struct Space {
    x: Vec<f32>,
    b: Vec<f32>,
}

impl<F: Form> Multigrid<F> {
    /// All levels of an operator; ties may change later, layers may not.
    pub fn new(
        operator: &Operator<F>,
        coarsening: Coarsening,
    ) -> Result<Self, NotPositiveDefinite> {
        let mut levels: Vec<Level<F>> = Vec::new();
        let mut lines = [operator.plan.x.clone(), operator.plan.y.clone()];
        let block: usize = operator.groups.iter().map(|group| group[1]).sum();
        let mut widest = coarsening.widest;
        let mut matrix: Option<Matrix<F, f64>> = None;
        loop {
            let fine = matrix.as_ref().unwrap_or(&operator.matrix);
            let cost = Coarsest::<F>::cost([lines[0].len(), lines[1].len()], block);
            if cost <= coarsening.cheap {
                break;
            }
            let transfer = Transfer::new(&lines, widest);
            let before = lines[0].len() * lines[1].len();
            if transfer.columns() * 10 > before * 9 {
                if cost <= coarsening.dearest || transfer.columns() <= 4 {
                    break;
                }
                widest *= 1.5;
                continue;
            }
            let coarse = transfer.coarse(fine);
            levels.push(Level::new(fine, &operator.groups, transfer)?);
            lines = levels[levels.len() - 1].transfer.kept_lines(&lines);
            matrix = Some(coarse);
        }
        let stride = operator.matrix.stride;
        let spaces = levels
            .iter()
            .map(|level| {
                let length = level.columns() * stride;
                Space {
                    x: vec![0.0; length],
                    b: vec![0.0; length],
                }
            })
            .collect();
        let coarsest = Coarsest::new(
            matrix.unwrap_or_else(|| operator.matrix.clone()),
            &operator.groups,
        )?;
        Ok(Self {
            levels,
            coarsest,
            spaces,
        })
    }

    /// Takes over the operator's ties between groups; ties inside one group are fixed.
    pub fn renew(
        &mut self,
        operator: &Operator<F>,
        factor: Factor,
    ) -> Result<(), NotPositiveDefinite> {
        let mut couplings = operator.matrix.couplings.clone();
        for level in &mut self.levels {
            let coarse = couplings
                .iter()
                .map(|coupling| coarse_coupling(coupling, &level.transfer))
                .collect();
            level.renew(&couplings);
            couplings = coarse;
        }
        self.coarsest.matrix.couplings = couplings;
        match factor {
            Factor::Renewed => self.coarsest.refactor(),
            Factor::Kept => Ok(()),
        }
    }

    /// Number of columns on every level, coarsest last.
    pub fn columns(&self) -> Vec<usize> {
        let fine = self.levels.iter().map(Level::columns);
        let [nx, ny] = self.coarsest.matrix.lines;
        fine.chain([nx * ny]).collect()
    }

    /// One cycle: an approximate solution for a right-hand side.
    pub fn cycle(&mut self, rhs: &[f64], solution: &mut [f64]) {
        let Some(finest) = self.levels.first() else {
            solution.copy_from_slice(rhs);
            self.coarsest.solve(solution);
            return;
        };
        let largest = rhs.iter().fold(0.0_f64, |largest, r| largest.max(r.abs()));
        if largest == 0.0 || !largest.is_finite() {
            solution.copy_from_slice(rhs);
            return;
        }
        // Scaled, so that single precision neither overflows nor fades, whatever the units.
        let row = finest.row_length();
        let order = finest.row_order();
        for (i, slot) in order.iter().enumerate() {
            let from = &rhs[i * row..][..row];
            let to = &mut self.spaces[0].b[slot * row..][..row];
            for (to, from) in to.iter_mut().zip(from) {
                *to = (from / largest) as f32;
            }
        }
        descend(&self.levels, &self.coarsest, &mut self.spaces);
        for (i, slot) in order.iter().enumerate() {
            let from = &self.spaces[0].x[slot * row..][..row];
            for (to, from) in solution[i * row..][..row].iter_mut().zip(from) {
                *to = f64::from(*from) * largest;
            }
        }
    }
}

/// One cycle from the first of these levels downwards and back.
fn descend<F: Form>(levels: &[Level<F>], coarsest: &Coarsest<F>, spaces: &mut [Space]) {
    let Some((level, below)) = levels.split_first() else {
        return;
    };
    let (space, deeper) = spaces.split_first_mut().expect("one space for each level");
    level.first_sweep(&space.b, &mut space.x);
    if let Some(next) = deeper.first_mut() {
        level.restrict(&space.x, below[0].row_order(), &mut next.b);
        descend(below, coarsest, deeper);
        level.prolong(&deeper[0].x, below[0].row_order(), &mut space.x);
    } else {
        let mut values = vec![0.0; coarsest.length()];
        let order: Vec<usize> = (0..coarsest.matrix.lines[0]).collect();
        let mut coarse = vec![0.0_f32; values.len()];
        level.restrict(&space.x, &order, &mut coarse);
        for (value, single) in values.iter_mut().zip(&coarse) {
            *value = f64::from(*single);
        }
        coarsest.solve(&mut values);
        for (single, value) in coarse.iter_mut().zip(&values) {
            *single = *value as f32;
        }
        level.prolong(&coarse, &order, &mut space.x);
    }
    level.last_sweep(&space.b, &mut space.x);
}

#[cfg(test)]
mod tests;
