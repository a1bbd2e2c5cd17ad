//! Whole joints drawn, and the quantiles of what they answer with their own sampling error.

use rayon::prelude::*;

use crate::{
    estimate::{Band, Chain, DrawPlan, Drawn, Failure, Options, Realisation},
    numerics::sampling::{Missed, REACH, Sobol, Tail},
    uncertainty::{Answer, Input, QUANTILES, inputs, shares::Shares},
};

/// Scramblings among which the draws are divided, where there are draws enough.
const SCRAMBLES: usize = 16;
/// Fewest draws of one scrambling: fewer leave no 5 % quantile.
const FEWEST: usize = 32;
/// Fewest scramblings whose spread tells an error.
const FEWEST_SCRAMBLES: usize = 4;
/// Draws that one thread works out in one go; their sums are added in the order of the draws.
const TOGETHER: usize = 1024;

/// The draws of one case: bands of the answers that were asked for, and what they go with.
///
/// The draws are divided among independent scramblings of one sequence; the quantile is that of all
/// draws, and the spread of the quantiles of the scramblings is its sampling error. Any number of
/// draws is as unbiased; the error is least where every scrambling has a power of two.
/// Answers are not kept, so that memory hardly grows with the number of draws.
pub struct Draws {
    /// Inputs that were moved.
    pub(super) inputs: Vec<Input>,
    /// How source to sink goes with each of them.
    pub(super) shares: Shares,
    scrambles: usize,
    ends: Vec<(Answer, [End; 2])>,
}

/// One end of a band.
struct End {
    value: f64,
    /// Standard error of the quantile; none where the scramblings are too few to tell.
    error: Option<f64>,
    /// Draws so far and quantile after a fourth, a half and all of the scramblings.
    course: Vec<(usize, f64)>,
}

/// What to draw.
pub(super) struct Task<'a> {
    pub(super) plan: &'a DrawPlan<'a>,
    pub(super) inputs: &'a [Input],
    pub(super) answers: &'a [Answer],
    pub(super) options: &'a Options,
    /// Quantiles at the ends of a band.
    pub(super) quantiles: [f64; 2],
    /// Inputs that stay at their nominal values.
    pub(super) known: &'a [usize],
}

/// Draws whole joints for some answers; the order of the draws, not of the threads, orders the
/// outcome.
pub fn draws(
    chain: &Chain,
    (case, answers): (usize, &[Answer]),
    options: &Options,
) -> Result<Draws, Failure> {
    draws_between(chain, (case, answers, QUANTILES), options)
}

/// The same with bands between other quantiles.
pub(super) fn draws_between(
    chain: &Chain,
    (case, answers, quantiles): (usize, &[Answer], [f64; 2]),
    options: &Options,
) -> Result<Draws, Failure> {
    let plan = chain.draw_plan(case)?;
    let inputs = inputs(chain);
    Task {
        plan: &plan,
        inputs: &inputs,
        answers,
        options,
        quantiles,
        known: &[],
    }
    .drawn()
}

/// Number of scramblings among which so many draws are divided.
fn scrambles(draws: usize) -> usize {
    (draws / FEWEST).clamp(1, SCRAMBLES)
}

impl Task<'_> {
    /// The draws.
    pub(super) fn drawn(&self) -> Result<Draws, Failure> {
        // What lies outside the reach of the first scrambling is looked for once more, everywhere.
        if let Ok(draws) = self.within(REACH)? {
            return Ok(draws);
        }
        let everywhere = self.within(f64::INFINITY)?;
        Ok(everywhere.unwrap_or_else(|Missed| unreachable!("every value is kept")))
    }

    fn within(&self, reach: f64) -> Result<Result<Draws, Missed>, Failure> {
        let count = self.options.draws as usize;
        let scrambles = scrambles(count);
        let mut tails: Vec<[Tail; 2]> = Vec::new();
        let mut shares = Shares::of(self.inputs.len());
        for scramble in 0..scrambles {
            let size = count / scrambles + usize::from(scramble < count % scrambles);
            let drawn = self.scramble((scramble, size), &mut shares)?;
            let part = |answer: &Answer| -> Vec<f64> {
                drawn.iter().map(|drawn| answer.of(drawn)).collect()
            };
            if tails.is_empty() {
                tails = self
                    .answers
                    .par_iter()
                    .map(|answer| {
                        let values = part(answer);
                        self.quantiles.map(|p| Tail::around(p, &values, reach))
                    })
                    .collect();
            }
            let taken: Result<Vec<()>, Missed> = tails
                .par_iter_mut()
                .zip(self.answers)
                .map(|(tails, answer)| {
                    let values = part(answer);
                    tails.iter_mut().try_for_each(|tail| tail.take(&values))
                })
                .collect();
            if let Err(missed) = taken {
                return Ok(Err(missed));
            }
        }
        let ends = self.answers.iter().zip(&tails).map(|(answer, tails)| {
            let [low, high] = tails.each_ref().map(|tail| End::of(tail, scrambles));
            Ok((*answer, [low?, high?]))
        });
        Ok(ends.collect::<Result<_, Missed>>().map(|ends| Draws {
            inputs: self.inputs.to_vec(),
            shares,
            scrambles,
            ends,
        }))
    }

    /// The draws of one scrambling, in the order of its points.
    fn scramble(
        &self,
        (scramble, size): (usize, usize),
        shares: &mut Shares,
    ) -> Result<Vec<Drawn>, Failure> {
        let sobol = Sobol::replicate(self.inputs.len(), self.options.seed, scramble);
        let starts: Vec<usize> = (0..size).step_by(TOGETHER).collect();
        let done = starts
            .par_iter()
            .map_init(
                || self.plan.workspace(),
                |workspace, start| {
                    let mut walk = sobol.walk(*start as u32);
                    let mut point = vec![0.0; self.inputs.len()];
                    let mut sums = Shares::of(self.inputs.len());
                    let mut readings = vec![0.0; self.inputs.len()];
                    let count = TOGETHER.min(size - start);
                    let mut found = Vec::with_capacity(count);
                    for _ in 0..count {
                        walk.next_into(&mut point);
                        let at = placed(self.inputs, &point, self.known);
                        let drawn = self.plan.drawn(&at, workspace)?;
                        for (reading, input) in readings.iter_mut().zip(self.inputs) {
                            *reading = (input.reading)(&at);
                        }
                        sums.take(&readings, drawn.source_to_sink.ln());
                        found.push(drawn);
                    }
                    Ok((found, sums))
                },
            )
            .collect::<Result<Vec<(Vec<Drawn>, Shares)>, Failure>>()?;
        let mut all = Vec::with_capacity(size);
        for (found, sums) in done {
            all.extend(found);
            shares.add(&sums);
        }
        Ok(all)
    }
}

/// Every input at its quantile, but for those that stay at nominal.
pub(super) fn placed(inputs: &[Input], point: &[f64], known: &[usize]) -> Realisation {
    let mut at = Realisation::default();
    for (index, (input, u)) in inputs.iter().zip(point).enumerate() {
        if !known.contains(&index) {
            (input.place)(&mut at, *u);
        }
    }
    at
}

impl End {
    fn of(tail: &Tail, scrambles: usize) -> Result<Self, Missed> {
        let tells = scrambles >= FEWEST_SCRAMBLES;
        let course = if tells {
            vec![scrambles / 4, scrambles / 2, scrambles]
        } else {
            vec![scrambles]
        };
        let course = course.into_iter().map(|parts| tail.after(parts));
        let course = course.collect::<Result<Vec<_>, Missed>>()?;
        Ok(Self {
            value: course[course.len() - 1].1,
            error: tells.then(|| tail.standard_error()),
            course,
        })
    }
}

impl Draws {
    /// Number of scramblings.
    pub fn scrambles(&self) -> usize {
        self.scrambles
    }

    fn ends(&self, answer: Answer) -> &[End; 2] {
        let found = self.ends.iter().find(|(each, _)| *each == answer);
        &found
            .expect("an answer is read only where it was asked for")
            .1
    }

    /// The band of an answer around its nominal value; it always holds the nominal.
    pub fn band(&self, answer: Answer, nominal: f64) -> Band {
        let [low, high] = self.ends(answer).each_ref().map(|end| end.value);
        Band {
            low: Some(low.min(nominal)),
            nominal,
            high: Some(high.max(nominal)),
        }
    }

    /// Standard error of both ends of a band; none where the scramblings are too few to tell.
    pub fn errors(&self, answer: Answer) -> Option<[f64; 2]> {
        let [low, high] = self.ends(answer);
        Some([low.error?, high.error?])
    }

    /// Both quantiles after a fourth, a half and all of the draws.
    pub fn course(&self, answer: Answer) -> Vec<(usize, [f64; 2])> {
        let [low, high] = self.ends(answer);
        let pairs = low.course.iter().zip(&high.course);
        pairs
            .map(|((count, low), (_, high))| (*count, [*low, *high]))
            .collect()
    }
}
