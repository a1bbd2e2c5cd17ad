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
    let Some(index) = low.filter(|index| *index > 0) else {
        return Ok(None);
    };
    let right = if index + 1 < allowed {
        known(&points[index + 1])
    } else {
        // Between the last swept torque that strength allows and the largest the curve may turn.
        match largest.filter(|largest| index + 1 < points.len() && *largest > points[index].torque)
        {
            Some(largest) => solved(largest)?,
            None => return Ok(None),
        }
    };
    let mut bracket = [known(&points[index - 1]), known(&points[index]), right];
    if bracket[2].source_to_sink <= bracket[1].source_to_sink {
        return Ok(None);
    }
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
    Ok(Some(bracket[1]))
}
