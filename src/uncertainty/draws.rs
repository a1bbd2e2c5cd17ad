//! Whole joints drawn, and the quantiles of what they answer with their own sampling error.

use rayon::prelude::*;

use crate::{
    estimate::{
        Band, Bend, Bent, Chain, DrawPlan, Drawn, Failure, Options, Realisation, Workspace,
    },
    numerics::sampling::{Missed, REACH, Sobol, Tail},
    uncertainty::{Answer, BENDING, Input, QUANTILES, inputs, shares::Shares},
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
///
/// Which way faces are bent whose flatness is a height alone is one fact about the joint that nobody
/// knows, not one that differs from draw to draw: drawn by a coin, the worse way would hold the end of
/// the band in half of the draws only. Every draw is read convex, flat and concave, and the band reaches
/// from the lowest of the three lower ends to the highest of the three upper ones, so that it holds its
/// share of the draws whichever way the faces are.
/// Checked: `the_band_holds_its_share_whichever_way_faces_are_bent`.
pub struct Draws {
    /// Inputs that were moved.
    pub(super) inputs: Vec<Input>,
    /// How source to sink goes with each of them.
    pub(super) shares: Shares,
    scrambles: usize,
    /// One band, or one for each way faces may be bent.
    ends: Vec<(Answer, Vec<[End; 2]>)>,
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
    /// Ways in which every draw is read: one, or each in which the faces may be bent.
    fn ways(&self) -> usize {
        let mut inputs = self.inputs.iter().enumerate();
        let bends =
            inputs.any(|(index, input)| input.name == BENDING && !self.known.contains(&index));
        if bends { Bend::ALL.len() } else { 1 }
    }

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
        let ways = self.ways();
        let answers = self.answers.iter();
        let sought: Vec<(Answer, usize)> = answers
            .flat_map(|answer| (0..ways).map(|way| (*answer, way)))
            .collect();
        let mut tails: Vec<[Tail; 2]> = Vec::new();
        let mut shares = Shares::of(self.inputs.len());
        for scramble in 0..scrambles {
            let size = count / scrambles + usize::from(scramble < count % scrambles);
            let drawn = self.scramble((scramble, size), &mut shares)?;
            let part = |(answer, way): &(Answer, usize)| -> Vec<f64> {
                drawn[*way].iter().map(|drawn| answer.of(drawn)).collect()
            };
            if tails.is_empty() {
                tails = sought
                    .par_iter()
                    .map(|sought| {
                        let values = part(sought);
                        self.quantiles.map(|p| Tail::around(p, &values, reach))
                    })
                    .collect();
            }
            let taken: Result<Vec<()>, Missed> = tails
                .par_iter_mut()
                .zip(&sought)
                .map(|(tails, sought)| {
                    let values = part(sought);
                    tails.iter_mut().try_for_each(|tail| tail.take(&values))
                })
                .collect();
            if let Err(missed) = taken {
                return Ok(Err(missed));
            }
        }
        let ends = self.answers.iter().zip(tails.chunks(ways));
        let ends = ends.map(|(answer, tails)| {
            let each = tails.iter().map(|tails| {
                let [low, high] = tails.each_ref().map(|tail| End::of(tail, scrambles));
                Ok([low?, high?])
            });
            Ok((*answer, each.collect::<Result<Vec<[End; 2]>, Missed>>()?))
        });
        Ok(ends.collect::<Result<_, Missed>>().map(|ends| Draws {
            inputs: self.inputs.to_vec(),
            shares,
            scrambles,
            ends,
        }))
    }

    /// The draws of one scrambling, way by way in the order of its points.
    fn scramble(
        &self,
        (scramble, size): (usize, usize),
        shares: &mut Shares,
    ) -> Result<Vec<Vec<Drawn>>, Failure> {
        let ways = self.ways();
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
                    let mut found: Vec<Vec<Drawn>> =
                        (0..ways).map(|_| Vec::with_capacity(count)).collect();
                    for _ in 0..count {
                        walk.next_into(&mut point);
                        let at = placed(self.inputs, &point, self.known);
                        let whole = self.read(&at, workspace, &mut found)?;
                        for (reading, input) in readings.iter_mut().zip(self.inputs) {
                            *reading = (input.reading)(&at);
                        }
                        sums.take(&readings, whole.ln());
                    }
                    Ok((found, sums))
                },
            )
            .collect::<Result<Vec<(Vec<Vec<Drawn>>, Shares)>, Failure>>()?;
        let mut all: Vec<Vec<Drawn>> = (0..ways).map(|_| Vec::with_capacity(size)).collect();
        for (found, sums) in done {
            for (all, found) in all.iter_mut().zip(found) {
                all.extend(found);
            }
            shares.add(&sums);
        }
        Ok(all)
    }

    /// Reads a draw in every way; gives source to sink as it is bent itself, K/W.
    fn read(
        &self,
        at: &Realisation,
        workspace: &mut Workspace,
        found: &mut [Vec<Drawn>],
    ) -> Result<f64, Failure> {
        if let [only] = found {
            let drawn = self.plan.drawn(at, workspace)?;
            only.push(drawn);
            return Ok(drawn.source_to_sink);
        }
        let drawn = self.plan.drawn_bent(at, workspace)?;
        for (found, drawn) in found.iter_mut().zip(drawn) {
            found.push(drawn);
        }
        Ok(drawn[Bend::of(at.flatness) as usize].source_to_sink)
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

    fn ends(&self, answer: Answer) -> &[[End; 2]] {
        let found = self.ends.iter().find(|(each, _)| *each == answer);
        &found
            .expect("an answer is read only where it was asked for")
            .1
    }

    /// The band of an answer around its nominal value; it always holds the nominal.
    pub fn band(&self, answer: Answer, nominal: f64) -> Band {
        let ends = self.ends(answer).iter();
        let [low, high] = ends.fold([nominal; 2], |[least, most], [low, high]| {
            [low.value.min(least), high.value.max(most)]
        });
        Band {
            low: Some(low),
            nominal,
            high: Some(high),
        }
    }

    /// The ends by the way the faces are bent, as drawn; none where they are not bent by themselves.
    pub fn bent(&self, answer: Answer) -> Option<Bent> {
        let values = |ends: &[End; 2]| ends.each_ref().map(|end| end.value);
        match self.ends(answer) {
            [convex, flat, concave] => Some(Bent([convex, flat, concave].map(values))),
            _ => None,
        }
    }

    /// Standard error of both ends of a band; none where the scramblings are too few to tell.
    pub fn errors(&self, answer: Answer) -> Option<[f64; 2]> {
        let ends = || self.ends(answer).iter();
        let low = ends().map(|[low, _]| low);
        let low = low.min_by(|one, other| one.value.total_cmp(&other.value))?;
        let high = ends().map(|[_, high]| high);
        let high = high.max_by(|one, other| one.value.total_cmp(&other.value))?;
        Some([low.error?, high.error?])
    }

    /// Both ends after a fourth, a half and all of the draws.
    pub fn course(&self, answer: Answer) -> Vec<(usize, [f64; 2])> {
        let ends = self.ends(answer);
        let parts = ends.first().map_or(0, |[low, _]| low.course.len());
        (0..parts)
            .map(|part| {
                let each = ends
                    .iter()
                    .map(|ends| ends.each_ref().map(|end| end.course[part]));
                let mut count = 0;
                let none = [f64::INFINITY, f64::NEG_INFINITY];
                let reached = each.fold(none, |[least, most], [(draws, low), (_, high)]| {
                    count = draws;
                    [least.min(low), most.max(high)]
                });
                (count, reached)
            })
            .collect()
    }
}
