//! Requirements: which answer they limit, and how a joint stands to them.

use crate::{
    estimate::{Band, Bent, CaseResult, LARGE_ERROR, Met, RequirementResult},
    joint::{Joint, Limit, Plane, Requirement, RequirementKind, What},
    uncertainty::{Answer, Draws},
};

/// Holds the requirement against the unfavourable end of the band; a field that is not trusted
/// leaves what it meets uncertain.
pub(super) fn judge(joint: &Joint, case: &mut CaseResult, (trusted, bent): (bool, Option<Bent>)) {
    case.requirement = joint.service.require.and_then(|require| {
        let band = band(case, require)?;
        let unfavourable = match require.bound {
            Limit::Most => band.high,
            Limit::Least => band.low,
        };
        let holds = |value: f64| match require.bound {
            Limit::Most => value <= require.limit,
            Limit::Least => value >= require.limit,
        };
        // What the grid does not resolve meets nothing for sure.
        let trusted = trusted && case.numerical_error <= LARGE_ERROR;
        let met = match (holds(band.nominal), unfavourable.map(holds)) {
            (true, Some(true)) if trusted => Met::Yes,
            (true, _) => Met::Uncertain,
            (false, _) => Met::No,
        };
        Some(RequirementResult {
            kind: require.kind,
            limit: require.limit,
            bound: require.bound,
            value: unfavourable.unwrap_or(band.nominal),
            bent,
            met,
        })
    });
}

/// The band of the limited quantity; none where it needs heat and none is stated.
fn band(case: &CaseResult, require: Requirement) -> Option<Band> {
    Some(match require.kind {
        RequirementKind::Rise => case.rise?.source,
        RequirementKind::HottestRise => case.rise?.hottest,
        RequirementKind::AboveCoolant => case.rise?.above_coolant?[0],
        RequirementKind::HottestAboveCoolant => case.rise?.above_coolant?[1],
        RequirementKind::InterfaceDrop => case.rise?.interface_drop,
        RequirementKind::Resistance(plane) => resistance(case, plane),
        RequirementKind::Conductance(plane) => resistance(case, plane).inverse(),
    })
}

fn resistance(case: &CaseResult, plane: Plane) -> Band {
    match plane {
        Plane::Contact => case.results.contact,
        Plane::NodeToNode => case.results.node_to_node,
        Plane::AddedByJoint => case.results.added_by_joint,
        Plane::SourceToSink => case.results.source_to_sink,
    }
    .resistance
}

/// What the draws of a joint are asked for: what is printed, and what is limited.
pub(super) fn asked(joint: &Joint) -> Vec<Answer> {
    let mut asked = Answer::asked(joint);
    if let Some((answer, _)) = limited(joint)
        && !asked.contains(&answer)
    {
        asked.push(answer);
    }
    asked
}

/// The ends of the limited quantity by the way the faces are bent; none where nothing is required or the
/// faces are not bent by themselves.
pub(super) fn bent(joint: &Joint, draws: &Draws) -> Option<Bent> {
    let (answer, scale) = limited(joint)?;
    Some(draws.bent(answer)?.map(|ends| scale.of(ends)))
}

/// The requirement as a source-to-sink resistance, where it can be put so.
pub(super) fn required(joint: &Joint) -> Option<(f64, Limit)> {
    let require = joint.service.require?;
    let flipped = match require.bound {
        Limit::Most => Limit::Least,
        Limit::Least => Limit::Most,
    };
    match require.kind {
        // A heat that scatters leaves no one resistance.
        RequirementKind::Rise if joint.spread_of(What::Heat).is_none() => {
            Some((require.limit / joint.service.heat?, require.bound))
        }
        RequirementKind::Resistance(Plane::SourceToSink) => Some((require.limit, require.bound)),
        RequirementKind::Conductance(Plane::SourceToSink) => Some((require.limit.recip(), flipped)),
        _ => None,
    }
}

/// The limited quantity over the answer it is read from.
#[derive(Clone, Copy, Debug)]
pub(super) enum Over {
    /// So many times the answer.
    Times(f64),
    /// Its inverse.
    Inverse,
}

impl Over {
    /// Low and high of the quantity from those of the answer.
    pub(super) fn of(self, [low, high]: [f64; 2]) -> [f64; 2] {
        match self {
            Self::Times(factor) => [factor * low, factor * high],
            Self::Inverse => [high.recip(), low.recip()],
        }
    }
}

/// The answer from which a limited quantity is read; none where it needs heat and none is stated.
pub(super) fn limited(joint: &Joint) -> Option<(Answer, Over)> {
    let (require, heat) = (joint.service.require?, joint.service.heat);
    let scatters = joint.scatters_heat();
    let risen = |resistance: Answer, rise: Answer| if scatters { rise } else { resistance };
    let answer = |plane: Plane| match plane {
        Plane::Contact => Answer::Contact,
        Plane::NodeToNode => Answer::NodeToNode,
        Plane::AddedByJoint => Answer::AddedByJoint,
        Plane::SourceToSink => Answer::SourceToSink,
    };
    Some(match require.kind {
        RequirementKind::Rise => (
            risen(Answer::SourceToSink, Answer::SourceRise),
            Over::Times(heat?),
        ),
        RequirementKind::HottestRise => (
            risen(Answer::Hottest, Answer::HottestRise),
            Over::Times(heat?),
        ),
        RequirementKind::AboveCoolant => (Answer::AboveCoolant, Over::Times(heat?)),
        RequirementKind::HottestAboveCoolant => (Answer::HottestAboveCoolant, Over::Times(heat?)),
        RequirementKind::InterfaceDrop => (
            risen(Answer::InterfaceDrop, Answer::DropRise),
            Over::Times(heat?),
        ),
        RequirementKind::Resistance(plane) => (answer(plane), Over::Times(1.0)),
        RequirementKind::Conductance(plane) => (answer(plane), Over::Inverse),
    })
}
