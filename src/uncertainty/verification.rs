//! Draws solved one by one beside the surfaces that all draws are read from.

use crate::{
    estimate::{Chain, Failure, Options},
    numerics::sampling::Sobol,
    uncertainty::{draws::placed, inputs},
};

/// How far the surfaces were off at draws that were solved.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Verification {
    /// Draws solved.
    pub draws: usize,
    /// Largest error of source to sink, relative.
    pub largest: f64,
    /// Mean of its size, relative.
    pub mean: f64,
}

/// Solves so many draws of a case as they are drawn, on the level of the surfaces, and holds them
/// against what the surfaces tell.
///
/// None on the cone, which solves every draw. Draws that leave hardly any force are passed over.
pub fn verification(
    chain: &Chain,
    case: usize,
    options: &Options,
) -> Result<Option<Verification>, Failure> {
    chain.expect_draws(case)?;
    let inputs = inputs(chain);
    // Not the draws of the bands themselves, so that neither knows of the other.
    let sobol = Sobol::replicate(inputs.len(), !options.seed, 0);
    let mut walk = sobol.walk(0);
    let mut point = vec![0.0; inputs.len()];
    let mut errors = Vec::new();
    for _ in 0..options.draws {
        walk.next_into(&mut point);
        let at = placed(&inputs, &point, &[]);
        if let Some([told, solved]) = chain.draw_beside(case, &at)? {
            errors.push((told / solved - 1.0).abs());
        }
    }
    if errors.is_empty() {
        return Ok(None);
    }
    Ok(Some(Verification {
        draws: errors.len(),
        largest: errors.iter().copied().fold(0.0, f64::max),
        mean: errors.iter().sum::<f64>() / errors.len() as f64,
    }))
}
