//! The torque of least resistance between the swept ones.

use crate::{
    estimate::{Chain, Failure, Minimum, Realisation, TorquePoint},
    numerics::bracket::next_trial,
};

/// Solutions that a minimum may take beyond the swept ones.
const MOST: usize = 8;
/// Rise of the resistance at both ends of the bracket at which its middle is the minimum, relative:
/// below what any of the fields can tell.
const FLAT: f64 = 2e-4;

/// Step inwards from an end of the window that tells whether the curve falls there, as a share of
/// the way to the next swept torque.
const STEP_INWARDS: f64 = 0.05;

/// The minimum of source to sink at nominal around the lowest swept torque that strength allows.
///
/// None where that is an end of the window: the curve then only falls or only rises in it. Every
/// torque tried is solved on the field of the chain.
///
/// Checked: `the_minimum_in_air_lies_between_swept_torques`.
pub(super) fn minimum(
    chain: &Chain,
    (group, case): (usize, usize),
    (points, largest): (&[TorquePoint], Option<f64>),
) -> Result<Option<Minimum>, Failure> {
    let solved = |torque: f64| -> Result<Minimum, Failure> {
        let chain = chain.with_torque(group, torque)?;
        let path = chain.state(case, &Realisation::default())?.path;
        Ok(Minimum {
            torque,
            source_to_sink: path.source_to_sink,
            added_by_joint: path.added_by_joint,
        })
    };
    let known = |point: &TorquePoint| Minimum {
        torque: point.torque,
        source_to_sink: point.source_to_sink.nominal,
        added_by_joint: point.added_by_joint.nominal,
    };
    let allowed = points.iter().take_while(|point| point.passes).count();
    let low = (0..allowed).min_by(|one, other| {
        let key = |index: &usize| points[*index].source_to_sink.nominal;
        key(one).total_cmp(&key(other))
    });
    let Some(index) = low else {
        return Ok(None);
    };
    let middle = known(&points[index]);
    let left = index.checked_sub(1).map(|left| known(&points[left]));
    let right = if index + 1 < allowed {
        Some(known(&points[index + 1]))
    } else {
        // Between the last swept torque that strength allows and the largest the curve may turn.
        let beyond = index + 1 < points.len();
        let end = largest.filter(|largest| beyond && *largest > middle.torque);
        end.map(&solved).transpose()?
    };
    let inwards =
        |from: Minimum, to: Minimum| solved(from.torque + STEP_INWARDS * (to.torque - from.torque));
    let bracket = match (left, right) {
        (Some(left), Some(right)) => [left, middle, right],
        // At an end of the window the curve may still fall inwards.
        (None, Some(right)) => [middle, inwards(middle, right)?, right],
        (Some(left), None) => [left, inwards(middle, left)?, middle],
        (None, None) => return Ok(None),
    };
    let [ends, middle] = [[bracket[0], bracket[2]], [bracket[1]; 2]];
    let lower = |(end, middle): (Minimum, Minimum)| middle.source_to_sink < end.source_to_sink;
    if !ends.into_iter().zip(middle).all(lower) {
        return Ok(None);
    }
    narrowed(bracket, solved).map(Some)
}

/// The lowest point that a search inside a bracket meets.
fn narrowed(
    mut bracket: [Minimum; 3],
    solved: impl Fn(f64) -> Result<Minimum, Failure>,
) -> Result<Minimum, Failure> {
    for _ in 0..MOST {
        let [left, middle, right] = bracket;
        let highest = left.source_to_sink.max(right.source_to_sink);
        if highest <= (1.0 + FLAT) * middle.source_to_sink {
            break;
        }
        let place = |each: Minimum| (each.torque, each.source_to_sink);
        let tried = solved(next_trial([left, middle, right].map(place)))?;
        let (inner, outer) = if tried.torque < middle.torque {
            ([left, tried, middle], [tried, middle, right])
        } else {
            ([middle, tried, right], [left, middle, tried])
        };
        bracket = if tried.source_to_sink < middle.source_to_sink {
            inner
        } else {
            outer
        };
    }
    Ok(bracket[1])
}
