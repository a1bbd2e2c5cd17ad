//! A layout on the elastic field: nominal, and at the least and the largest force of the bolts.

use crate::{
    estimate::{Chain, Choice, Failure, ForceEnd, Realisation, Watch},
    joint::Joint,
    layout::Measure,
};

/// What the elastic field says of a layout, first case, K/W.
#[derive(Clone, Debug, PartialEq, serde::Deserialize, serde::Serialize)]
pub struct Solution {
    /// Source to sink at nominal: what `estimate` prints.
    pub source_to_sink: f64,
    /// The judged quantity at nominal.
    pub nominal: f64,
    /// The same at the least force of all bolts.
    pub least_force: f64,
    /// The same at their largest force.
    pub largest_force: f64,
}

impl Solution {
    /// The judged quantity at the three forces.
    pub fn values(&self) -> [f64; 3] {
        [self.nominal, self.least_force, self.largest_force]
    }
}

/// Solves a joint on a field of choice.
pub fn solved(joint: &Joint, choice: Choice, measure: Measure) -> Result<Solution, Failure> {
    let chain = Chain::of(joint, choice, &Watch::none())?;
    let path = chain.state(0, &Realisation::default())?.path;
    let at = |end: ForceEnd| -> Result<f64, Failure> {
        let chain = chain.at_force_end(0, end)?;
        Ok(measure.of(&chain.state(0, &Realisation::default())?.path))
    };
    Ok(Solution {
        source_to_sink: path.source_to_sink,
        nominal: measure.of(&path),
        least_force: at(ForceEnd::Least)?,
        largest_force: at(ForceEnd::Largest)?,
    })
}
