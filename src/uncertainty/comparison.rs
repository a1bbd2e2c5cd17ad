//! Joints side by side: whether one is surely better, or the choice does not matter.

use rayon::prelude::*;

use super::{Input, inputs, requirement::required, worst_case};
use crate::{
    estimate::{Chain, Estimate, Failure, Loss, Options, Realisation},
    joint::{Limit, Mass},
    numerics::sampling::Sobol,
};

/// Odds from which the better joint is called so (judgement).
const SURE: f64 = 0.95;
/// Odds below which the choice is called one that does not matter (judgement).
const EVEN: f64 = 0.75;

/// One of several joints.
#[derive(Clone, Debug, PartialEq)]
pub struct Compared {
    /// What it is called: file, and variant where there are some.
    pub name: String,
    /// All four results with their bands.
    pub estimate: Estimate,
    /// The case it stands worst in, which is compared.
    pub case: usize,
    /// What it weighs.
    pub mass: Mass,
    /// Number of bolts that clamp.
    pub bolts: usize,
    /// What it costs by the user's own measure.
    pub cost: Option<f64>,
    /// The single loss that costs most; none for one bolt, and where it was not asked for.
    pub loss: Option<Loss>,
    /// Odds that the best joint beats this one, 0 to 1; none without draws and for the best itself.
    pub odds: Option<f64>,
    /// What that says; none for the best itself.
    pub verdict: Option<Verdict>,
}

/// How the best joint stands to another.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Verdict {
    /// Better in 95 of 100 joints or more.
    Surely,
    /// Better in 75 to 95 of 100 joints.
    Likely,
    /// The bands overlap so much that the choice does not matter.
    Even,
    /// Both differ by less than the numerical error tells apart.
    WithinError,
    /// Better at nominal; without draws nobody knows how surely.
    AtNominal,
}

/// What is asked of the joints.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// To pass heat: the least source to sink is best.
    Pass,
    /// To resist: the largest source to sink is best.
    Resist,
}

/// Joints side by side.
#[derive(Clone, Debug, PartialEq)]
pub struct Comparison {
    /// In the order given.
    pub joints: Vec<Compared>,
    /// Index of the best at nominal.
    pub best: usize,
    /// What best means.
    pub sense: Sense,
    /// What all joints must meet as source to sink, K/W; none where they differ in it.
    pub required: Option<f64>,
}

/// A joint before it is compared.
pub struct Contender<'a> {
    /// What it is called.
    pub name: String,
    /// Its chain.
    pub chain: &'a Chain<'a>,
    /// Low, nominal and high.
    pub estimate: Estimate,
    /// The single loss that costs most.
    pub loss: Option<Loss>,
}

/// Compares joints that were estimated; at least one.
///
/// All are drawn once more with common numbers: an input of the same name takes the same quantile in
/// every joint of a draw (the same lot, the same tool), inputs that only some have stay their own.
/// Checked: `odds_are_those_counted_by_hand`, `like_joints_beat_each_other_in_half_of_the_draws`.
pub fn comparison(contenders: Vec<Contender>, options: &Options) -> Result<Comparison, Failure> {
    let cases = contenders
        .iter()
        .map(|each| worst_case(each.chain))
        .collect::<Result<Vec<usize>, Failure>>()?;
    let sense = sense(&contenders);
    let limits: Vec<Option<f64>> = contenders
        .iter()
        .map(|each| required(each.chain.joint()).map(|(limit, _)| limit))
        .collect();
    let one = limits.iter().all(|limit| *limit == limits[0]);
    let nominal: Vec<f64> = contenders
        .iter()
        .zip(&cases)
        .map(|(each, case)| {
            let results = &each.estimate.cases[*case].results;
            results.source_to_sink.resistance.nominal
        })
        .collect();
    let best = (1..nominal.len()).fold(0, |best, next| {
        if sense.beats(nominal[next], nominal[best]) {
            next
        } else {
            best
        }
    });
    let drawn = if options.draws > 0 {
        let tasks: Vec<(&Chain, usize)> = contenders
            .iter()
            .zip(&cases)
            .map(|(each, case)| (each.chain, *case))
            .collect();
        Some(side_by_side(&tasks, options)?)
    } else {
        None
    };
    let joints = contenders.into_iter().enumerate().map(|(index, each)| {
        let joint = each.chain.joint();
        let odds = drawn
            .as_ref()
            .filter(|_| index != best)
            .map(|drawn| sense.odds(&drawn[best], &drawn[index]));
        let error = each.estimate.cases[cases[index]].numerical_error;
        let apart = (nominal[index] / nominal[best] - 1.0).abs();
        Compared {
            verdict: (index != best).then(|| verdict(odds, apart <= error)),
            odds,
            mass: joint.mass(),
            bolts: joint.clamping(),
            cost: joint.cost,
            case: cases[index],
            name: each.name,
            estimate: each.estimate,
            loss: each.loss,
        }
    });
    Ok(Comparison {
        joints: joints.collect(),
        best,
        sense,
        required: if one { limits[0] } else { None },
    })
}

/// What the odds and the difference at nominal say.
///
/// Errors of like grids cancel in part, so that a difference beyond that of one joint counts.
fn verdict(odds: Option<f64>, within_error: bool) -> Verdict {
    match odds {
        _ if within_error => Verdict::WithinError,
        None => Verdict::AtNominal,
        Some(odds) if odds >= SURE => Verdict::Surely,
        Some(odds) if odds >= EVEN => Verdict::Likely,
        Some(_) => Verdict::Even,
    }
}

/// A joint that must resist at least so much sets the sense for all.
fn sense(contenders: &[Contender]) -> Sense {
    let resists =
        |each: &Contender| matches!(required(each.chain.joint()), Some((_, Limit::Least)));
    if contenders.iter().any(resists) {
        Sense::Resist
    } else {
        Sense::Pass
    }
}

impl Sense {
    fn beats(self, one: f64, other: f64) -> bool {
        match self {
            Self::Pass => one < other,
            Self::Resist => one > other,
        }
    }

    /// Share of the draws in which one is better than the other; a tie counts half.
    fn odds(self, one: &[f64], other: &[f64]) -> f64 {
        /// Closer than this, relative, is a tie: rounding.
        const TIE: f64 = 1e-12;
        let points = one.iter().zip(other).map(|(one, other)| {
            if (one - other).abs() <= TIE * other.abs() {
                0.5
            } else {
                f64::from(u8::from(self.beats(*one, *other)))
            }
        });
        points.sum::<f64>() / one.len() as f64
    }
}

/// Draws that one thread works out in one go.
const TOGETHER: usize = 1024;

/// Source to sink of several joints, each in a case, drawn with common numbers, K/W: joint by joint,
/// draw by draw.
///
/// Inputs of one name in one joint (the friction of each of its bolts) meet those of another joint in
/// their order.
pub fn side_by_side(
    joints: &[(&Chain, usize)],
    options: &Options,
) -> Result<Vec<Vec<f64>>, Failure> {
    let own: Vec<Vec<Input>> = joints.iter().map(|(chain, _)| inputs(chain)).collect();
    let mut common: Vec<(&'static str, usize)> = Vec::new();
    let places: Vec<Vec<usize>> = own
        .iter()
        .map(|own| numbered(own).map(|key| place(&mut common, key)).collect())
        .collect();
    let sobol = Sobol::new(common.len(), options.seed);
    let starts: Vec<usize> = (0..options.draws as usize).step_by(TOGETHER).collect();
    let drawn = joints.iter().zip(own.iter().zip(&places));
    drawn
        .map(|((chain, case), (own, places))| {
            let plan = chain.draw_plan(*case)?;
            let parts = starts
                .par_iter()
                .map_init(
                    || plan.workspace(),
                    |workspace, start| {
                        let mut walk = sobol.walk(*start as u32);
                        let mut point = vec![0.0; common.len()];
                        let count = TOGETHER.min(options.draws as usize - start);
                        (0..count)
                            .map(|_| {
                                walk.next_into(&mut point);
                                let mut at = Realisation::default();
                                for (input, place) in own.iter().zip(places) {
                                    (input.place)(&mut at, point[*place]);
                                }
                                Ok(plan.drawn(&at, workspace)?.source_to_sink)
                            })
                            .collect::<Result<Vec<f64>, Failure>>()
                    },
                )
                .collect::<Result<Vec<Vec<f64>>, Failure>>()?;
            Ok(parts.concat())
        })
        .collect()
}

/// Every input by its name and its number among those of that name.
fn numbered(inputs: &[Input]) -> impl Iterator<Item = (&'static str, usize)> {
    inputs.iter().enumerate().map(|(index, input)| {
        let before = inputs[..index].iter();
        let alike = before.filter(|other| other.name == input.name);
        (input.name, alike.count())
    })
}

/// Place of an input among the common ones, where it is added when it is new.
fn place(common: &mut Vec<(&'static str, usize)>, key: (&'static str, usize)) -> usize {
    let known = common.iter().position(|other| *other == key);
    known.unwrap_or_else(|| {
        common.push(key);
        common.len() - 1
    })
}
