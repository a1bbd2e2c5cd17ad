//! Preconditioned conjugate gradients.

use rayon::prelude::*;

use crate::numerics::{
    columns::{Form, Operator},
    multigrid::Multigrid,
};

/// How far to go.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Effort {
    /// Residual to reach, relative to `reference`.
    pub tolerance: f64,
    /// Share of the squared energy norm of the error at the start to reach besides, as the cycle M
    /// sees it: `rᵀ M r`. It weighs soft motions by how far they go, where a residual hardly sees
    /// them; none asks for the residual alone.
    pub energy: Option<f64>,
    /// Length that residuals are measured by; none takes the right-hand side's.
    pub reference: Option<f64>,
    /// Iterations after which the solution is given up.
    pub most: usize,
}

impl Default for Effort {
    fn default() -> Self {
        Self {
            tolerance: 1e-8,
            energy: None,
            reference: None,
            most: 300,
        }
    }
}

/// What a solution took.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Solved {
    /// Iterations.
    pub iterations: usize,
    /// Residual left, relative to the reference.
    pub residual: f64,
}

/// Why a solution was given up.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
#[error(
    "conjugate gradients stopped after {iterations} iterations at a residual of {residual:.2e}"
)]
pub struct Stalled {
    /// Iterations done.
    pub iterations: usize,
    /// Residual left, relative to the reference; not a number where the input is not.
    pub residual: f64,
}

/// Solves the operator's equations from the start value in `x`, guided by the multigrid cycle.
///
/// The cycle rounds to single precision, so that the next direction is made orthogonal to the last
/// with the change of the residual, which forgives a preconditioner that is not quite symmetric.
pub fn conjugate_gradients<F: Form>(
    operator: &Operator<F>,
    multigrid: &mut Multigrid<F>,
    (rhs, x): (&[f64], &mut [f64]),
    effort: &Effort,
) -> Result<Solved, Stalled> {
    let mut image = operator.zeros();
    operator.product(x, &mut image);
    let mut residual = image.clone();
    for (residual, rhs) in residual.iter_mut().zip(rhs) {
        *residual = rhs - *residual;
    }
    let length = |vector: &[f64]| operator.dot(vector, vector).sqrt();
    let reference = effort.reference.unwrap_or_else(|| length(rhs));
    let mut left = length(&residual);
    if reference == 0.0 && left == 0.0 {
        return Ok(Solved {
            iterations: 0,
            residual: 0.0,
        });
    }
    let mut turned = operator.zeros();
    let mut direction = operator.zeros();
    let mut norm = 0.0;
    let mut step = 0.0;
    let mut enough = f64::INFINITY;
    for iterations in 0..=effort.most {
        let solved = Solved {
            iterations,
            residual: left / reference,
        };
        let small = left <= effort.tolerance * reference;
        if small && (effort.energy.is_none() || left == 0.0) {
            return Ok(solved);
        }
        if !left.is_finite() || iterations == effort.most {
            break;
        }
        multigrid.cycle(&residual, &mut turned);
        let next = operator.dot(&residual, &turned);
        if let (0, Some(share)) = (iterations, effort.energy) {
            enough = share * next;
        }
        if small && next <= enough {
            return Ok(solved);
        }
        // −step · image is the last change of the residual.
        let keep = if iterations == 0 {
            0.0
        } else {
            -step * operator.dot(&turned, &image) / norm
        };
        norm = next;
        each(&mut direction, &turned, |direction, turned| {
            *direction = turned + keep * *direction;
        });
        operator.product(&direction, &mut image);
        let curvature = operator.dot(&direction, &image);
        if !(curvature > 0.0 && curvature.is_finite()) {
            return Err(Stalled {
                iterations,
                residual: left / reference,
            });
        }
        step = operator.dot(&residual, &direction) / curvature;
        each(x, &direction, |x, direction| *x += step * direction);
        each(&mut residual, &image, |residual, image| {
            *residual -= step * image;
        });
        left = length(&residual);
    }
    Err(Stalled {
        iterations: effort.most,
        residual: left / reference,
    })
}

/// Changes one vector by another, entry by entry.
fn each(one: &mut [f64], other: &[f64], change: impl Fn(&mut f64, f64) + Sync) {
    const TOGETHER: usize = 16384;
    one.par_chunks_mut(TOGETHER)
        .zip(other.par_chunks(TOGETHER))
        .for_each(|(one, other)| {
            for (one, other) in one.iter_mut().zip(other) {
                change(one, *other);
            }
        });
}
