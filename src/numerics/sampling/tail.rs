//! Quantiles of a sample that comes in parts and is not kept: exact, from what lies near them.

/// Standard errors of the first part around its own quantile that are kept of every part.
///
/// The error of the first part itself takes one of them; that the rest fails is a matter of nine
/// standard errors, and [`Tail::take`] tells it.
pub const REACH: f64 = 10.0;

/// The values that did not lie where they were looked for: a wider reach is needed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Missed;

/// The neighbourhood of one quantile in a sample of several parts.
///
/// Below it values are counted, inside it they are kept: of parts of n values about
/// 20 √(p(1 − p)/n) of all, so that memory hardly grows with the number of parts. The quantile is
/// that of the whole sample, to the last digit.
/// Checked: `parts_give_the_quantile_of_the_whole`.
#[derive(Clone, Debug)]
pub struct Tail {
    probability: f64,
    window: [f64; 2],
    inside: Vec<f64>,
    below: usize,
    count: usize,
    /// Where the parts end: values so far, below, inside.
    parts: Vec<[usize; 3]>,
    /// Quantile of each part alone.
    own: Vec<f64>,
}

impl Tail {
    /// The neighbourhood that the first part tells; its values are still to be taken.
    pub fn around(probability: f64, first: &[f64], reach: f64) -> Self {
        let count = first.len() as f64;
        let width = reach * (probability * (1.0 - probability) / count).sqrt();
        let mut values = first.to_vec();
        let mut at = |place: f64, beyond: f64| {
            let rank = (place * count).floor();
            if rank < 1.0 || rank >= count - 1.0 || rank.is_nan() {
                beyond
            } else {
                *values
                    .select_nth_unstable_by(rank as usize, f64::total_cmp)
                    .1
            }
        };
        Self {
            probability,
            window: [
                at(probability - width, f64::NEG_INFINITY),
                at(probability + width, f64::INFINITY),
            ],
            inside: Vec::new(),
            below: 0,
            count: 0,
            parts: Vec::new(),
            own: Vec::new(),
        }
    }

    /// Takes the next part; its values are numbers or infinite.
    pub fn take(&mut self, part: &[f64]) -> Result<(), Missed> {
        let start = self.inside.len();
        let [low, high] = self.window;
        let mut below = 0;
        for value in part {
            if *value < low {
                below += 1;
            } else if *value <= high {
                self.inside.push(*value);
            }
        }
        self.inside[start..].sort_by(f64::total_cmp);
        let own = placed(self.probability, part.len(), (below, &self.inside[start..]));
        self.own.push(own.ok_or(Missed)?);
        self.below += below;
        self.count += part.len();
        self.parts.push([self.count, self.below, self.inside.len()]);
        Ok(())
    }

    /// Number of values and their quantile after so many parts.
    pub fn after(&self, parts: usize) -> Result<(usize, f64), Missed> {
        let [count, below, inside] = self.parts[parts - 1];
        let mut values = self.inside[..inside].to_vec();
        values.sort_by(f64::total_cmp);
        let found = placed(self.probability, count, (below, &values)).ok_or(Missed)?;
        Ok((count, found))
    }

    /// Standard error of the quantile of all parts from the spread of those of the parts; not a
    /// number for one part.
    ///
    /// ```text
    /// s = √(Σ (q_r − q̄)²/(R − 1))/√R
    /// ```
    pub fn standard_error(&self) -> f64 {
        let parts = self.own.len() as f64;
        let mean = self.own.iter().sum::<f64>() / parts;
        let squares: f64 = self.own.iter().map(|own| (own - mean).powi(2)).sum();
        (squares / (parts - 1.0) / parts).sqrt()
    }

    /// Values that are kept.
    pub fn kept(&self) -> usize {
        self.inside.len()
    }
}

/// The quantile of a sample of which rising values are known after so many lower ones: that of
/// [`super::quantile`].
fn placed(probability: f64, count: usize, (below, known): (usize, &[f64])) -> Option<f64> {
    let last = count.checked_sub(1)?;
    let place = last as f64 * probability;
    let lower = (place.floor() as usize).min(last);
    let upper = (lower + 1).min(last);
    let at = |rank: usize| known.get(rank.checked_sub(below)?).copied();
    let (lower_value, upper_value) = (at(lower)?, at(upper)?);
    let share = place - lower as f64;
    // Equal ends may both be infinite.
    Some(if share > 0.0 && upper_value > lower_value {
        lower_value + share * (upper_value - lower_value)
    } else {
        lower_value
    })
}

#[cfg(test)]
#[expect(clippy::float_cmp, reason = "these results are exact")]
mod tests {
    use super::*;
    use crate::numerics::{
        sampling::{Sobol, quantile},
        special::normal_quantile,
    };

    /// Values e^z of a normal z, part by part from independent scramblings.
    fn parts(count: usize, each: u32) -> Vec<Vec<f64>> {
        (0..count)
            .map(|part| {
                let sobol = Sobol::replicate(1, 9, part);
                let mut walk = sobol.walk(0);
                let mut point = [0.0];
                (0..each)
                    .map(|_| {
                        walk.next_into(&mut point);
                        normal_quantile(point[0]).exp()
                    })
                    .collect()
            })
            .collect()
    }

    #[test]
    fn parts_give_the_quantile_of_the_whole() {
        for (count, each) in [(1, 20), (3, 33), (16, 64), (16, 1000), (8, 20_000)] {
            let parts = parts(count, each);
            let mut whole: Vec<f64> = Vec::new();
            for probability in [0.05, 0.5, 0.95] {
                let mut tail = Tail::around(probability, &parts[0], REACH);
                whole.clear();
                for (index, part) in parts.iter().enumerate() {
                    tail.take(part).unwrap();
                    whole.extend(part);
                    let mut sorted = whole.clone();
                    sorted.sort_by(f64::total_cmp);
                    let (values, found) = tail.after(index + 1).unwrap();
                    assert_eq!(values, whole.len());
                    assert_eq!(found, quantile(&sorted, probability), "{count} {each}");
                }
            }
        }
    }

    // 20 √(0.0475/20 000) = 3.1 % of the values, and half as much again.
    #[test]
    fn few_values_are_kept_of_many() {
        let parts = parts(8, 20_000);
        let mut tail = Tail::around(0.05, &parts[0], REACH);
        for part in &parts {
            tail.take(part).unwrap();
        }
        assert!(tail.kept() < 7_500, "{}", tail.kept());
    }

    #[test]
    fn a_part_that_lies_elsewhere_is_told() {
        let first: Vec<f64> = (0..10_000).map(f64::from).collect();
        let mut tail = Tail::around(0.5, &first, REACH);
        assert_eq!(tail.take(&first), Ok(()));
        assert_eq!(tail.take(&vec![1e9; 10_000]), Err(Missed));
        let mut wide = Tail::around(0.5, &first, f64::INFINITY);
        assert_eq!(wide.take(&first), Ok(()));
        assert_eq!(wide.take(&vec![1e9; 10_000]), Ok(()));
        assert_eq!(wide.after(2), Ok((20_000, 9999.0 + 0.5 * (1e9 - 9999.0))));
    }

    #[test]
    fn infinite_values_have_their_place() {
        let sample = [1.0, 2.0, f64::INFINITY, f64::INFINITY, f64::INFINITY];
        let mut tail = Tail::around(0.95, &sample, REACH);
        tail.take(&sample).unwrap();
        assert_eq!(tail.after(1), Ok((5, f64::INFINITY)));
    }

    // For n independent values s = √(p(1 − p)/N)/f(q): 0.05 at the lower tail of e^z. Scrambled
    // points in one dimension do far better, so plain random numbers stand in: 200 parts, the
    // estimate of a deviation from them good to 5 %, three of those.
    #[test]
    fn standard_error_is_that_of_the_textbook() {
        let (count, each) = (200_usize, 2000_usize);
        // Beyond its table the sequence is made of independent numbers.
        let mut tail: Option<Tail> = None;
        let mut point = vec![0.0; 66];
        for part in 0..count {
            let sobol = Sobol::replicate(66, 4, part);
            let mut walk = sobol.walk(0);
            let values: Vec<f64> = (0..each)
                .map(|_| {
                    walk.next_into(&mut point);
                    normal_quantile(point[65]).exp()
                })
                .collect();
            tail.get_or_insert_with(|| Tail::around(0.05, &values, REACH))
                .take(&values)
                .unwrap();
        }
        let z = normal_quantile(0.05);
        let density = (-0.5 * z * z).exp() / (2.0 * std::f64::consts::PI).sqrt() / z.exp();
        let wanted = (0.05 * 0.95 / (count * each) as f64).sqrt() / density;
        let found = tail.unwrap().standard_error();
        assert!((found / wanted - 1.0).abs() < 0.15, "{found} {wanted}");
    }
}
