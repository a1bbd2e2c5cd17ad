//! A layout on the elastic field: every case at nominal, at the least and the largest force of the bolts,
//! and the band of the draws.

use crate::{
    estimate::{self, Chain, Choice, Failure, ForceEnd, Options, Realisation, Watch},
    joint::Joint,
    layout::{Measure, Target},
    uncertainty,
};

/// What the elastic field says of a layout in one case, K/W.
#[derive(Clone, Copy, Debug, PartialEq, serde::Deserialize, serde::Serialize)]
pub struct InCase {
    /// Source to sink at nominal: what `estimate` prints.
    pub source_to_sink: f64,
    /// The judged quantity at nominal.
    pub nominal: f64,
    /// The same at the least force of all bolts.
    pub least_force: f64,
    /// The same at their largest force.
    pub largest_force: f64,
}

impl InCase {
    /// The judged quantity at the three forces.
    pub fn values(&self) -> [f64; 3] {
        [self.nominal, self.least_force, self.largest_force]
    }
}

/// What the elastic field says of a layout, case by case.
#[derive(Clone, Debug, PartialEq, serde::Deserialize, serde::Serialize)]
pub struct Solution {
    /// Every case, in the order of the joint.
    pub cases: Vec<InCase>,
}

impl Solution {
    /// The case that governs: the one whose worst value at any of the three forces is worst.
    pub fn governing(&self, target: &Target) -> usize {
        let worst = |case: &InCase| {
            let values = case.values();
            values
                .map(|value| target.rank(value))
                .into_iter()
                .fold(f64::NEG_INFINITY, f64::max)
        };
        let cases = 0..self.cases.len();
        // The first of equals.
        cases
            .rev()
            .max_by(|one, other| worst(&self.cases[*one]).total_cmp(&worst(&self.cases[*other])))
            .unwrap_or(0)
    }

    /// Whether the limit is met in every case: at nominal, and at both ends of the force.
    pub fn meets(&self, target: &Target) -> [bool; 2] {
        let all = |of: &dyn Fn(&InCase) -> bool| self.cases.iter().all(of);
        [
            all(&|case| target.meets(case.nominal)),
            all(&|case| case.values().iter().all(|value| target.meets(*value))),
        ]
    }
}

/// Solves a joint on a field of choice.
pub fn solved(joint: &Joint, choice: Choice, measure: Measure) -> Result<Solution, Failure> {
    let chain = Chain::of(joint, choice, &Watch::none())?;
    let cases = (0..joint.service.cases.len()).map(|case| {
        let path = chain.state(case, &Realisation::default())?.path;
        let at = |end: ForceEnd| -> Result<f64, Failure> {
            let chain = chain.at_force_end(case, end)?;
            Ok(measure.of(&chain.state(case, &Realisation::default())?.path))
        };
        Ok(InCase {
            source_to_sink: path.source_to_sink,
            nominal: measure.of(&path),
            least_force: at(ForceEnd::Least)?,
            largest_force: at(ForceEnd::Largest)?,
        })
    });
    Ok(Solution {
        cases: cases.collect::<Result<Vec<InCase>, Failure>>()?,
    })
}

/// Low and high of the judged quantity in every case, as `estimate` draws them, K/W.
pub fn banded(
    joint: &Joint,
    (choice, measure): (Choice, Measure),
    options: &Options,
) -> Result<Vec<[f64; 2]>, Failure> {
    let chain = Chain::of(joint, choice, &Watch::none())?;
    // The error of the grid is one of the inputs that are drawn.
    estimate::nominal(&chain, options)?;
    let answer = measure.answer();
    let cases = (0..joint.service.cases.len()).map(|case| {
        let nominal = answer.of(&chain.nominal_answers(case)?);
        let band = uncertainty::draws(&chain, (case, &[answer]), options)?.band(answer, nominal);
        Ok([band.low.unwrap_or(nominal), band.high.unwrap_or(nominal)])
    });
    cases.collect()
}
