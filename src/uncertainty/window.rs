//! The torque window: where heat and strength are both met, its ends found between the rows.

use std::cell::RefCell;

use crate::{
    catalog::{self, Thread},
    estimate::{
        Band, Chain, Drawn, End, Failure, Range, Realisation, Side, TorqueLimit, TorquePoint,
        TorqueWindow,
    },
    joint::{Limit, Plane, RequirementKind},
    numerics::roots,
    uncertainty::{
        Answer, Draws, SweepOptions,
        draws::draws_between,
        requirement::limited,
        sweep::Others,
        trials::{alternatives, trials},
    },
};

/// What ends a window where the requirement does.
pub const REQUIREMENT: &str = "the requirement";
/// What ends a window at the first torque swept.
pub const FIRST: &str = "the first torque swept";
/// What ends a window at the last torque swept.
pub const LAST: &str = "the last torque swept";
/// What ends a window from below where nothing does.
pub const NOTHING: &str = "no limit";

/// Share of the attainable conductance of the joint at the knee.
const KNEE: f64 = 0.9;
/// Closeness of the ends of the window, as a share of the largest torque swept: no tool sets closer.
const CLOSE: f64 = 1e-3;

/// One torque group in one case, held against what is required.
#[derive(Clone, Copy)]
pub(super) struct Sought<'a> {
    /// The chain as stated.
    pub chain: &'a Chain<'a>,
    /// Group, draws and confidence.
    pub options: &'a SweepOptions,
    /// The case.
    pub case: usize,
    /// Torques swept, N m.
    pub range: [f64; 2],
}

/// Quantiles of a band that holds a share of the draws.
fn quantiles(confidence: f64) -> [f64; 2] {
    [0.5 - 0.5 * confidence, 0.5 + 0.5 * confidence]
}

impl Sought<'_> {
    /// How far the unfavourable end of the band lies beyond what is required, relative; at most zero
    /// where it is met. None where nothing is required, or it needs heat and none is stated.
    pub(super) fn excess(&self, nominal: &Drawn, draws: Option<&Draws>) -> Option<f64> {
        let require = self.chain.joint().service.require?;
        let (answer, scale) = limited(self.chain.joint())?;
        let value = answer.of(nominal);
        let band = draws.map_or(Band::nominal(value), |draws| draws.band(answer, value));
        let [low, high] = scale.of([band.low.unwrap_or(value), band.high.unwrap_or(value)]);
        Some(match require.bound {
            Limit::Most => high / require.limit - 1.0,
            Limit::Least => 1.0 - low / require.limit,
        })
    }

    /// The draws of a chain for some answers, read at the confidence that is asked for.
    pub(super) fn drawn(&self, chain: &Chain<'_>, answers: &[Answer]) -> Result<Draws, Failure> {
        let ends = quantiles(self.options.confidence);
        draws_between(chain, (self.case, answers, ends), &self.options.chain)
    }

    /// The chain at a torque.
    fn at(&self, torque: f64) -> Result<Chain<'static>, Failure> {
        self.chain.with_torque(self.options.group, torque)
    }

    /// The excess at a torque without draws.
    pub(super) fn nominal_excess_at(&self, torque: f64) -> Result<f64, Failure> {
        let nominal = self.at(torque)?.nominal_answers(self.case)?;
        Ok(self.excess(&nominal, None).unwrap_or(f64::NAN))
    }

    /// The excess at a torque that was not swept.
    pub(super) fn excess_at(&self, torque: f64) -> Result<f64, Failure> {
        let chain = self.at(torque)?;
        let nominal = chain.nominal_answers(self.case)?;
        let drawn = match (self.options.chain.draws, limited(self.chain.joint())) {
            (0, _) | (_, None) => None,
            (_, Some((answer, _))) => Some(self.drawn(&chain, &[answer])?),
        };
        Ok(self.excess(&nominal, drawn.as_ref()).unwrap_or(f64::NAN))
    }

    fn added_at(&self, torque: f64) -> Result<f64, Failure> {
        let state = self.at(torque)?.state(self.case, &Realisation::default())?;
        Ok(state.path.added_by_joint)
    }

    /// Where a function of torque passes zero between two torques on either side of it.
    fn crossing(
        &self,
        of: impl Fn(f64) -> Result<f64, Failure>,
        [low, high]: [f64; 2],
    ) -> Result<f64, Failure> {
        let failed = RefCell::new(None);
        let value = |torque: f64| {
            of(torque).unwrap_or_else(|failure| {
                failed.replace(Some(failure));
                f64::NAN
            })
        };
        let found = roots::bracketed(value, low, high, CLOSE * self.range[1]);
        match (found, failed.into_inner()) {
            (Some(torque), _) => Ok(torque),
            (None, Some(failure)) => Err(failure),
            // Rounding at an end took the change of sign away: the end is the crossing.
            (None, None) => Ok(high),
        }
    }

    /// The ranges in which the requirement is met, from swept torques and further ones with their excess.
    pub(super) fn heat(&self, mut known: Vec<(f64, f64)>) -> Result<Vec<Range>, Failure> {
        known.sort_by(|one, other| one.0.total_cmp(&other.0));
        let met = |excess: f64| excess <= 0.0;
        let mut ranges = Vec::new();
        let mut open: Option<End> = None;
        let mut before: Option<(f64, f64)> = None;
        for &(torque, excess) in &known {
            match (open, met(excess)) {
                (None, true) => {
                    open = Some(match before {
                        None => End { torque, by: FIRST },
                        Some((last, _)) => End {
                            torque: self
                                .crossing(|torque| self.excess_at(torque), [last, torque])?,
                            by: REQUIREMENT,
                        },
                    });
                }
                (Some(low), false) => {
                    let last = before.map_or(torque, |(last, _)| last);
                    let high = End {
                        torque: self.crossing(|torque| self.excess_at(torque), [last, torque])?,
                        by: REQUIREMENT,
                    };
                    ranges.push(Range { low, high });
                    open = None;
                }
                _ => {}
            }
            before = Some((torque, excess));
        }
        if let (Some(low), Some((torque, _))) = (open, before) {
            ranges.push(Range {
                low,
                high: End { torque, by: LAST },
            });
        }
        Ok(ranges)
    }

    /// Torque at which the joint's own conductance reaches its knee; none where it lies below the first
    /// torque swept or the joint adds nothing.
    pub(super) fn knee(
        &self,
        points: &[TorquePoint],
        attainable: Option<f64>,
    ) -> Result<Option<f64>, Failure> {
        let Some(least) = attainable.filter(|least| *least > 0.0) else {
            return Ok(None);
        };
        let wanted = least / KNEE;
        let over = |point: &TorquePoint| point.added_by_joint.nominal > wanted;
        let pair = points
            .windows(2)
            .find(|pair| over(&pair[0]) && !over(&pair[1]));
        match pair {
            Some([one, other]) => self
                .crossing(
                    |torque| Ok(self.added_at(torque)? - wanted),
                    [one.torque, other.torque],
                )
                .map(Some),
            _ => Ok(None),
        }
    }

    /// Least resistance that the joint can add within separation and strength: at the rows that pass, at
    /// the minimum between them and at both ends.
    fn attainable(
        &self,
        points: &[TorquePoint],
        ([least, largest], minimum): ([Option<f64>; 2], Option<f64>),
    ) -> Result<Option<f64>, Failure> {
        let holds = |point: &&TorquePoint| least.is_none_or(|least| point.torque >= least);
        let rows = points.iter().filter(|point| point.passes).filter(holds);
        let mut added: Vec<f64> = rows.map(|point| point.added_by_joint.nominal).collect();
        added.extend(minimum);
        let ends = match (least, largest) {
            (Some(least), Some(largest)) if least > largest => [None; 2],
            ends => ends.into(),
        };
        for end in ends.into_iter().flatten() {
            if self.is_swept(end) {
                added.push(self.added_at(end)?);
            }
        }
        Ok(added.into_iter().min_by(f64::total_cmp))
    }

    fn is_swept(&self, torque: f64) -> bool {
        (self.range[0]..=self.range[1]).contains(&torque)
    }
}

/// What the window is made of: rows with their excess, and the best torque between them.
pub(super) struct Rows<'r> {
    /// The rows.
    pub points: &'r [TorquePoint],
    /// How far each lies beyond what is required; empty where nothing is.
    pub excess: &'r [Option<f64>],
    /// The minimum between the rows: torque, and what the joint adds there, K/W.
    pub minimum: Option<(f64, f64)>,
    /// Whether grid and flatness leave the verdict sure.
    pub trusted: bool,
}

/// The torque window of a sweep.
pub(super) fn window(
    sought: &Sought<'_>,
    rows: &Rows<'_>,
    others: &Others<'_>,
) -> Result<TorqueWindow, Failure> {
    let Sought { chain, options, .. } = *sought;
    let limits = chain.torque_limits(options.group);
    let strength = allowed(chain, options.group, &limits);
    let most = chain
        .largest_torque(options.group)
        .map(|(torque, _)| torque);
    let resists = matches!(chain.joint().service.require, Some(require) if require.bound == least_of(require.kind));
    let attainable = if resists {
        None
    } else {
        let least = limits.iter().find(|limit| limit.side == Side::Least);
        let ends = [least.map(|limit| limit.torque), most];
        sought.attainable(rows.points, (ends, rows.minimum.map(|(_, added)| added)))?
    };
    let heat = ranges(sought, rows, &limits)?;
    let both = joined(strength, heat.as_deref());
    let ratio = force_ratio(sought, (strength, heat.as_deref()))?;
    let thread = &chain.joint().fasteners[options.group].thread;
    let mut window = TorqueWindow {
        confidence: (options.chain.draws > 0).then_some(options.confidence),
        knee: sought.knee(rows.points, attainable)?,
        force_ratio: ratio,
        larger_thread: ratio.and_then(|ratio| larger(thread, ratio)),
        trusted: rows.trusted,
        plates_fail: plates_fail(sought)?,
        limits,
        strength,
        heat,
        both,
        trials: Vec::new(),
    };
    if window.both.is_none() && window.heat.is_some() && !window.plates_fail {
        window.trials = trials(sought, rows.minimum.map(|(torque, _)| torque))?;
        window.trials.extend(alternatives(sought, others())?);
    }
    Ok(window)
}

/// The bound of a requirement that asks for much resistance.
fn least_of(kind: RequirementKind) -> Limit {
    match kind {
        RequirementKind::Conductance(_) => Limit::Most,
        _ => Limit::Least,
    }
}

/// The ranges in which the heat is met, none where nothing is required.
fn ranges(
    sought: &Sought<'_>,
    rows: &Rows<'_>,
    limits: &[TorqueLimit],
) -> Result<Option<Vec<Range>>, Failure> {
    let swept = rows.points.iter().map(|point| point.torque);
    let known: Option<Vec<(f64, f64)>> = swept
        .zip(rows.excess)
        .map(|(torque, excess)| Some((torque, (*excess)?)))
        .collect();
    let Some(mut known) = known.filter(|known| !known.is_empty()) else {
        return Ok(None);
    };
    // Between rows the heat may be met at the ends of strength or at the minimum alone.
    let ends = limits
        .iter()
        .find(|limit| limit.side == Side::Most)
        .into_iter()
        .chain(limits.iter().filter(|limit| limit.side == Side::Least))
        .map(|limit| limit.torque);
    let further = ends.chain(rows.minimum.map(|(torque, _)| torque));
    for torque in further.filter(|torque| sought.is_swept(*torque)) {
        known.push((torque, sought.excess_at(torque)?));
    }
    sought.heat(known).map(Some)
}

/// What strength and separation allow.
pub(super) fn allowed(chain: &Chain<'_>, group: usize, limits: &[TorqueLimit]) -> Option<Range> {
    let (torque, by) = chain.largest_torque(group)?;
    let low = limits
        .iter()
        .find(|limit| limit.side == Side::Least)
        .map_or(
            End {
                torque: 0.0,
                by: NOTHING,
            },
            |limit| End {
                torque: limit.torque,
                by: limit.name,
            },
        );
    (low.torque < torque).then_some(Range {
        low,
        high: End { torque, by },
    })
}

/// The widest part that strength and heat share; strength alone where nothing is required.
fn joined(strength: Option<Range>, heat: Option<&[Range]>) -> Option<Range> {
    let strength = strength?;
    let Some(heat) = heat else {
        return Some(strength);
    };
    let width = |range: &Range| range.high.torque - range.low.torque;
    heat.iter()
        .filter_map(|range| range.shared(strength))
        .max_by(|one, other| width(one).total_cmp(&width(other)))
}

/// Whether even perfect contact fails what is required of the whole path.
fn plates_fail(sought: &Sought<'_>) -> Result<bool, Failure> {
    let Some(require) = sought.chain.joint().service.require else {
        return Ok(false);
    };
    let path = sought
        .chain
        .state(sought.case, &Realisation::default())?
        .path;
    let limit = match (
        require.kind,
        require.bound,
        sought.chain.joint().service.heat,
    ) {
        (RequirementKind::Rise, Limit::Most, Some(heat)) => require.limit / heat,
        (RequirementKind::Resistance(Plane::SourceToSink), Limit::Most, _) => require.limit,
        (RequirementKind::Conductance(Plane::SourceToSink), Limit::Least, _) => {
            require.limit.recip()
        }
        _ => return Ok(false),
    };
    Ok(path.perfect_contact > limit)
}

/// Highest force where the heat is first met over that where strength ends; none where heat does not
/// begin above strength.
fn force_ratio(
    sought: &Sought<'_>,
    (strength, heat): (Option<Range>, Option<&[Range]>),
) -> Result<Option<f64>, Failure> {
    let (Some(strength), Some(first)) = (strength, heat.and_then(<[Range]>::first)) else {
        return Ok(None);
    };
    if first.low.torque < strength.high.torque || first.low.by != REQUIREMENT {
        return Ok(None);
    }
    let force = |torque: f64| {
        let chain = sought.at(torque)?;
        let band = chain.force(sought.options.group);
        Ok::<f64, Failure>(band.high.unwrap_or(band.nominal))
    };
    Ok(Some(
        force(first.low.torque)? / force(strength.high.torque)?,
    ))
}

/// The next coarse thread of the same system with so many times the stress area.
fn larger(thread: &Thread, ratio: f64) -> Option<String> {
    let wanted = ratio * thread.stress_area;
    catalog::threads()
        .iter()
        .filter(|each| each.inch == thread.inch && !each.name.contains(['x', '×']))
        .filter(|each| each.diameter > thread.diameter && each.stress_area >= wanted)
        .min_by(|one, other| one.stress_area.total_cmp(&other.stress_area))
        .map(|each| each.name.clone())
}
