//! Resistance against torque: the band at every torque, the limit of strength, the best torque.

use crate::{
    estimate::{
        self, Band, CaseResult, Chain, Failure, LARGE_ERROR, Minimum, Options, Side, TorquePoint,
        TorqueSweep,
    },
    joint::{Joint, Limit, Tightening},
};

use super::{
    Alternative, Answer,
    minimum::minimum,
    requirement::{asked, required},
    window::{Rows, Sought, window},
};

/// Which torques to try.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SweepOptions {
    /// Index of the fastener group that is varied.
    pub group: usize,
    /// Lowest torque, N m; a quarter of the stated torque when absent.
    pub from: Option<f64>,
    /// Highest torque, N m; past the stated and the largest torque when absent.
    pub to: Option<f64>,
    /// Number of torques evenly from lowest to highest, at least two; the stated torque comes on top.
    pub steps: usize,
    /// Share of the draws that every band holds, about the middle: 0.9 from 5 % to 95 %.
    pub confidence: f64,
    /// Draws and seed.
    pub chain: Options,
}

/// Share of the draws that a band holds unless told otherwise.
pub const CONFIDENCE: f64 = 0.9;

/// Steps that are sooner solved one by one than through a table over the force.
const FEW_STEPS: usize = 4;
/// Share of the stated torque at which a sweep starts unless told otherwise.
const START: f64 = 0.25;
/// How far past the stated and the largest torque a sweep runs unless told otherwise.
const BEYOND: f64 = 1.25;

/// Sweeps the torque of one group and runs the whole chain at each.
///
/// Every torque is drawn with the same points, so that differences between torques are not noise.
pub fn torque_sweep(joint: &Joint, options: &SweepOptions) -> Result<TorqueSweep, Failure> {
    sweep_along(&Chain::new(joint)?, options)
}

/// Like joints to try where the window is shut; made only then.
pub type Others<'a> = dyn Fn() -> Vec<Alternative> + 'a;

/// The same for a joint whose chain is prepared.
pub fn sweep_along(chain: &Chain, options: &SweepOptions) -> Result<TorqueSweep, Failure> {
    sweep_beside(chain, options, &Vec::new)
}

/// The same, with like joints that may open a window that is shut.
pub fn sweep_beside(
    chain: &Chain,
    options: &SweepOptions,
    others: &Others<'_>,
) -> Result<TorqueSweep, Failure> {
    let joint = chain.joint();
    let group = joint
        .fasteners
        .get(options.group)
        .ok_or(Failure::NoSuchGroup {
            asked: options.group + 1,
            known: joint.fasteners.len(),
        })?;
    let Tightening::Torque(stated) = &group.tightening else {
        return Err(Failure::NotByTorque {
            group: options.group + 1,
        });
    };
    let stated = stated.torque;
    let case = worst_case(chain)?;
    let largest = chain.largest_torque(options.group);
    let from = options.from.unwrap_or(START * stated);
    let to = options
        .to
        .unwrap_or_else(|| BEYOND * largest.map_or(stated, |(torque, _)| torque.max(stated)));
    if !(0.0 < from && from < to && to.is_finite() && options.steps >= 2) {
        return Err(Failure::SweepRange { from, to });
    }
    // First of all, so that every torque knows the error of the grid.
    let nominal = estimate::nominal(chain, &options.chain)?;
    let fine = |case: &CaseResult| case.numerical_error <= LARGE_ERROR;
    let trusted = nominal.cases.iter().all(fine) && !nominal.flatness_decides();
    let cautions = nominal.cautions;
    // Without draws every torque is solved for itself, which is soon done.
    if options.steps > FEW_STEPS && options.chain.draws > 0 {
        chain.expect_torques((case, options.group), [from, to])?;
    }
    let sought = Sought {
        chain,
        options,
        case,
        range: [from, to],
    };
    let rows = torques([from, to], (options.steps, stated))
        .into_iter()
        .map(|torque| point(&sought, torque))
        .collect::<Result<Vec<(TorquePoint, Option<f64>)>, Failure>>()?;
    let (points, excess): (Vec<TorquePoint>, Vec<Option<f64>>) = rows.into_iter().unzip();
    let required = required(joint);
    let limits = chain.torque_limits(options.group);
    let least = limits.iter().find(|limit| limit.side == Side::Least);
    let least = least.map(|limit| limit.torque);
    let minimum = match required {
        Some((_, Limit::Least)) => None,
        _ if chain.knows_the_gap() => {
            let window = (points.as_slice(), largest.map(|(torque, _)| torque));
            minimum(chain, (options.group, case), window)?
        }
        _ => None,
    };
    let window = window(
        &sought,
        &Rows {
            points: &points,
            excess: &excess,
            minimum: minimum.map(|minimum| (minimum.torque, minimum.added_by_joint)),
            trusted,
        },
        others,
    )?;
    let at = |torque: f64| -> Result<Minimum, Failure> {
        let path = chain
            .with_torque(options.group, torque)?
            .state(case, &estimate::Realisation::default())?
            .path;
        Ok(Minimum {
            torque,
            source_to_sink: path.source_to_sink,
            added_by_joint: path.added_by_joint,
        })
    };
    let held = minimum.filter(|found| least.is_none_or(|least| found.torque >= least));
    let row = match held {
        Some(minimum) => Some(minimum.torque),
        None => best_of(&points, (least, required)),
    };
    let at_limit = if held.is_some() {
        None
    } else {
        let ends = [least, largest.map(|(largest, _)| largest)];
        let ends = ends_beside(&points, (row, ends)).into_iter().map(at);
        let ends = ends.collect::<Result<Vec<Minimum>, Failure>>()?;
        best_end(&ends, (&points, row), required)
    };
    let best = at_limit.map(|limit| limit.torque).or(row);
    let mut sweep = TorqueSweep {
        title: joint.title.clone(),
        group: estimate::group_label(group),
        stated,
        largest,
        best,
        minimum,
        at_stated: at(stated)?.source_to_sink,
        at_limit,
        points,
        required,
        window,
        case: joint.service.cases[case].name,
        bends: chain.knows_the_gap() && joint.most_loose_flatness() > 0.0,
        field: chain.field_name(),
        resolution: chain.resolution_name(),
        cautions,
    };
    // In gas the gap grows with the force, which this field does not know: no torque is the best.
    if sweep.gap_unknown() {
        sweep.best = None;
        sweep.at_limit = None;
    }
    Ok(sweep)
}

/// Even torques of a range, and the stated one among them where it lies inside.
fn torques([from, to]: [f64; 2], (steps, stated): (usize, f64)) -> Vec<f64> {
    /// Nearer to a row than this part of a step, the stated torque is that row.
    const SAME: f64 = 1e-6;
    let step = (to - from) / (steps - 1) as f64;
    let even = |index: usize| from + (to - from) * index as f64 / (steps - 1) as f64;
    let mut found: Vec<f64> = (0..steps).map(even).collect();
    let inside = from < stated && stated < to;
    if inside && found.iter().all(|each| (each - stated).abs() > SAME * step) {
        let place = found.partition_point(|each| *each < stated);
        found.insert(place, stated);
    }
    found
}

/// The swept torque of least resistance that strength allows and separation asks for; of most where the
/// joint is to resist.
fn best_of(
    points: &[TorquePoint],
    (least, required): (Option<f64>, Option<(f64, Limit)>),
) -> Option<f64> {
    let sign = match required {
        Some((_, Limit::Least)) => -1.0,
        _ => 1.0,
    };
    let key = |point: &TorquePoint| sign * point.source_to_sink.nominal;
    let holds = |point: &&TorquePoint| least.is_none_or(|least| point.torque >= least);
    let allowed = points.iter().filter(|point| point.passes).filter(holds);
    let best = allowed.min_by(|one, other| key(one).total_cmp(&key(other)));
    best.map(|point| point.torque)
}

/// The ends of what separation and strength allow that lie between the best row and the next one beyond;
/// both where no row lies between them.
fn ends_beside(
    points: &[TorquePoint],
    (row, [least, largest]): (Option<f64>, [Option<f64>; 2]),
) -> Vec<f64> {
    let Some(row) = row else {
        let swept = |torque: &f64| {
            let (first, last) = (points.first(), points.last());
            first.is_some_and(|first| first.torque <= *torque)
                && last.is_some_and(|last| *torque <= last.torque)
        };
        return match (least, largest) {
            (Some(least), Some(largest)) if least < largest => {
                [least, largest].into_iter().filter(swept).collect()
            }
            _ => Vec::new(),
        };
    };
    let before = points.iter().rfind(|point| point.torque < row);
    let next = points.iter().find(|point| point.torque > row);
    let least =
        least.filter(|least| before.is_some_and(|before| before.torque < *least && *least < row));
    let largest = largest.filter(|largest| {
        next.is_some_and(|next| !next.passes && row < *largest && *largest < next.torque)
    });
    least.into_iter().chain(largest).collect()
}

/// The end of separation or strength at which the joint stands best; none where a row is better.
fn best_end(
    ends: &[Minimum],
    (points, row): (&[TorquePoint], Option<f64>),
    required: Option<(f64, Limit)>,
) -> Option<Minimum> {
    let sign = match required {
        Some((_, Limit::Least)) => -1.0,
        _ => 1.0,
    };
    let key = |end: &&Minimum| sign * end.source_to_sink;
    let best = ends
        .iter()
        .min_by(|one, other| key(one).total_cmp(&key(other)))?;
    let row = points
        .iter()
        .find(|point| row.is_some_and(|row| point.torque >= row));
    let better = row.is_none_or(|row| key(&best) < sign * row.source_to_sink.nominal);
    better.then_some(*best)
}

/// The case in which the joint stands worst: of most resistance, or of least where the requirement
/// asks for at least so much.
pub(crate) fn worst_case(chain: &Chain) -> Result<usize, Failure> {
    let cases = chain.joint().service.cases.len();
    let resistances = (0..cases)
        .map(|case| {
            Ok(chain
                .state(case, &estimate::Realisation::default())?
                .path
                .source_to_sink)
        })
        .collect::<Result<Vec<f64>, Failure>>()?;
    let least = matches!(required(chain.joint()), Some((_, Limit::Least)));
    let key = |case: &usize| {
        if least {
            -resistances[*case]
        } else {
            resistances[*case]
        }
    };
    Ok((0..cases)
        .max_by(|one, other| key(one).total_cmp(&key(other)))
        .unwrap_or(0))
}

/// One row, and how far it lies beyond what is required.
fn point(sought: &Sought<'_>, torque: f64) -> Result<(TorquePoint, Option<f64>), Failure> {
    let Sought { options, case, .. } = *sought;
    let chain = sought.chain.with_torque(options.group, torque)?;
    let nominal = chain.nominal_answers(case)?;
    let strength = chain.strength(options.group);
    let draws = match options.chain.draws {
        0 => None,
        _ => Some(sought.drawn(&chain, &asked(chain.joint()))?),
    };
    let band = |answer: Answer| {
        let value = answer.of(&nominal);
        let drawn = draws.as_ref().map(|draws| draws.band(answer, value));
        drawn.unwrap_or(Band::nominal(value))
    };
    let point = TorquePoint {
        torque,
        force: chain.force(options.group),
        source_to_sink: band(Answer::SourceToSink),
        contact: band(Answer::Contact),
        added_by_joint: band(Answer::AddedByJoint),
        strength_use: strength.equivalent,
        passes: strength.passes,
    };
    let excess = sought.excess(&nominal, draws.as_ref());
    Ok((point, excess))
}
