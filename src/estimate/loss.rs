//! One bolt lost: which loss costs most.

use crate::estimate::{Chain, Choice, Failure, Fineness, Realisation, Watch};

/// The single loss that costs most.
#[derive(Clone, Debug, PartialEq)]
pub struct Loss {
    /// Number of the bolt, from 1 in file order; of like bolts the first.
    pub bolt: usize,
    /// How many bolts stand like it, itself included.
    pub alike: usize,
    /// Source to sink without it over source to sink with all bolts, 1; none where the joint then has
    /// no solution, with the reason in `failure`.
    pub growth: Option<f64>,
    /// Why there is no solution.
    pub failure: Option<String>,
    /// How finely both were solved: `fast` on a solved field.
    pub resolution: &'static str,
}

/// The field on which losses are weighed: the quick one of its kind.
fn quick(choice: Choice) -> Choice {
    match choice {
        Choice::Cone => Choice::Cone,
        Choice::Elastic { memory, .. } => Choice::Elastic {
            fineness: Fineness::Fast,
            memory,
        },
    }
}

/// The worst single loss of a joint in one case, at nominal, whose chain stands on a choice; none where one bolt holds it alone.
///
/// Bolts that stand alike are tried once. A solved field is solved on the fast level with and without
/// each bolt, and the ratio of both is told: what the level errs by is in both.
pub fn worst_loss(
    chain: &Chain,
    choice: Choice,
    (case, watch): (usize, &Watch),
) -> Result<Option<Loss>, Failure> {
    let joint = chain.joint();
    if joint.clamping() < 2 {
        return Ok(None);
    }
    let own;
    let chain = if quick(choice) == choice {
        chain
    } else {
        own = Chain::of(joint, quick(choice), watch)?;
        &own
    };
    let whole = source_to_sink(chain, case)?;
    let losses = joint
        .like_bolts()
        .into_iter()
        .filter(|alike| !joint.is_missing(alike[0]))
        .map(|alike| {
            let left = chain.without(&[alike[0] + 1]);
            let found = left.and_then(|left| source_to_sink(&left, case));
            let (growth, failure) = match found {
                Ok(resistance) => (Some(resistance / whole), None),
                Err(failure) => (None, Some(failure.to_string())),
            };
            Loss {
                bolt: alike[0] + 1,
                alike: alike.len(),
                growth,
                failure,
                resolution: chain.resolution_name(),
            }
        });
    // What has no solution is worse than any number; of equal losses the first is told.
    let weight = |loss: &Loss| loss.growth.unwrap_or(f64::INFINITY);
    Ok(losses.reduce(|worst, next| {
        if weight(&next) > weight(&worst) {
            next
        } else {
            worst
        }
    }))
}

fn source_to_sink(chain: &Chain, case: usize) -> Result<f64, Failure> {
    let state = chain.state(case, &Realisation::default())?;
    chain.refuse_open(case, &state.conditions.forces)?;
    Ok(state.path.source_to_sink)
}
