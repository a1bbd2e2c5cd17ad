//! Worst cases: every input at the end that leads there.
//!
//! The trade states a least and a most force: lowest torque of the tool, highest friction, every
//! loss; and the other way round. In gas the extreme force is not the extreme resistance, so the
//! force is searched between its two corners; every other input stands at the end, or at nominal,
//! that leads furthest, taken in turn until none moves any more.

use rayon::prelude::*;

use crate::{
    estimate::{DrawPlan, Realisation, Worst},
    uncertainty::{Answer, Input, Moves},
};

/// Rounds over all inputs, if they do not come to rest sooner.
const MOST_ROUNDS: usize = 4;
/// Forces tried at once along the way between the corners, and how often the best third of it is
/// tried again.
const FORCES: usize = 9;
const ZOOMS: usize = 3;
/// A move smaller than this is none, relative.
const REST: f64 = 1e-9;

/// The results whose ends are sought.
const RESULTS: [Answer; 4] = [
    Answer::Contact,
    Answer::NodeToNode,
    Answer::AddedByJoint,
    Answer::SourceToSink,
];

/// Least and most of the four results of a case; none where an end has no number.
pub(super) fn worst(plan: &DrawPlan, inputs: &[Input]) -> Option<Worst> {
    let search = Search { plan, inputs };
    // Eight searches side by side, each in its own order: no thread decides what is found.
    let ends: Vec<Option<f64>> = (0..2 * RESULTS.len())
        .into_par_iter()
        .map(|which| {
            let sign = if which % 2 == 0 { -1.0 } else { 1.0 };
            search.extreme(RESULTS[which / 2], sign)
        })
        .collect();
    let pair = |result: usize| Some([ends[2 * result]?, ends[2 * result + 1]?]);
    Some(Worst {
        contact: pair(0)?,
        node_to_node: pair(1)?,
        added_by_joint: pair(2)?,
        source_to_sink: pair(3)?,
    })
}

/// What is searched.
struct Search<'a> {
    plan: &'a DrawPlan<'a>,
    inputs: &'a [Input],
}

/// Where every input stands: the force between its corners, the others at their quantiles.
#[derive(Clone)]
struct Standing {
    /// 0 at the least force, 1 at the most; none at nominal.
    force: Option<f64>,
    /// Quantiles by input, none at nominal; those that move the force are not read.
    others: Vec<Option<f64>>,
}

impl Search<'_> {
    /// The largest (sign +1) or smallest (sign −1) value of a result.
    fn extreme(&self, of: Answer, sign: f64) -> Option<f64> {
        let reach = |standing: &Standing| self.value(standing, of).map(|value| sign * value);
        let mut best = Standing {
            force: None,
            others: vec![None; self.inputs.len()],
        };
        let mut top = reach(&best)?;
        for _ in 0..MOST_ROUNDS {
            let before = top;
            self.along_force(&mut best, &mut top, &reach)?;
            for (place, input) in self.inputs.iter().enumerate() {
                if input.moves != Moves::Other {
                    continue;
                }
                for quantile in [Some(input.ends[0]), None, Some(input.ends[1])] {
                    let mut tried = best.clone();
                    tried.others[place] = quantile;
                    let value = reach(&tried)?;
                    if value > top {
                        (best, top) = (tried, value);
                    }
                }
            }
            if top - before <= REST * top.abs() {
                break;
            }
        }
        Some(sign * top)
    }

    /// Moves the force to where the result is furthest, all else held.
    fn along_force(
        &self,
        best: &mut Standing,
        top: &mut f64,
        reach: &impl Fn(&Standing) -> Option<f64>,
    ) -> Option<()> {
        if self.inputs.iter().all(|input| input.moves == Moves::Other) {
            return Some(());
        }
        let (mut low, mut high) = (0.0_f64, 1.0_f64);
        for _ in 0..ZOOMS {
            let step = (high - low) / (FORCES - 1) as f64;
            let mut furthest = (f64::NEG_INFINITY, low);
            for index in 0..FORCES {
                let force = low + step * index as f64;
                let tried = Standing {
                    force: Some(force),
                    ..best.clone()
                };
                let value = reach(&tried)?;
                if value > furthest.0 {
                    furthest = (value, force);
                }
            }
            if furthest.0 > *top {
                *top = furthest.0;
                best.force = Some(furthest.1);
            }
            (low, high) = ((furthest.1 - step).max(0.0), (furthest.1 + step).min(1.0));
        }
        Some(())
    }

    /// A result where everything stands; none where it has no number.
    fn value(&self, standing: &Standing, of: Answer) -> Option<f64> {
        let mut at = Realisation::default();
        for (input, other) in self.inputs.iter().zip(&standing.others) {
            let [low, high] = input.ends;
            let quantile = match input.moves {
                Moves::Other => *other,
                Moves::MoreForce => standing.force.map(|force| low + force * (high - low)),
                Moves::LessForce => standing.force.map(|force| high - force * (high - low)),
            };
            if let Some(quantile) = quantile {
                (input.place)(&mut at, quantile);
            }
        }
        let drawn = self.plan.drawn(&at, &mut self.plan.workspace()).ok()?;
        let value = of.of(&drawn);
        value.is_finite().then_some(value)
    }
}
