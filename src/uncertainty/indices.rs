//! Sobol indices: which share of the variance of an answer belongs to each of its inputs.

use rayon::prelude::*;

use crate::numerics::sampling::Sobol;

/// Independent scramblings from which the indices and their confidence are found.
const SCRAMBLES: usize = 16;
/// Student's t for 97.5 % and 15 degrees of freedom, from any table.
const STUDENT: f64 = 2.131;
/// Fewest base points: each scrambling needs some.
pub const FEWEST_BASES: u32 = 16 * 16;
/// Points that one thread works out in one go; their sums are added in the order of the points.
const TOGETHER: usize = 256;

/// A share with half the width of its 95 % interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Share {
    /// The share, 1.
    pub value: f64,
    /// Half the width of the interval that holds the true share in 95 of 100 runs.
    pub confidence: f64,
}

impl Share {
    /// Whether the share is more than its interval leaves open; an index that is nothing exactly is known.
    pub fn is_told(&self) -> bool {
        self.value.abs() > self.confidence || self.confidence < Self::NOTHING
    }

    /// Interval that is no question to anybody: a tenth of what a table prints.
    const NOTHING: f64 = 1e-4;
}

/// Indices of one group of inputs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Index {
    /// Share of the variance that goes if this group alone is known.
    pub first: Share,
    /// Share of the variance that is left if all but this group are known.
    pub total: Share,
}

/// How many base points of which groups of inputs, from which seed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Bases<'a> {
    /// Number of inputs.
    pub inputs: usize,
    /// Inputs that are one matter and move together, by their places among all.
    pub groups: &'a [Vec<usize>],
    /// Number of base points; the function is evaluated (groups + 2) times as often.
    pub points: u32,
    /// Seed.
    pub seed: u64,
}

/// Sums over base points, of values less a value that is near their mean.
#[derive(Clone, Debug)]
struct Sums {
    points: f64,
    /// Of both samples: values, and their squares.
    value: f64,
    square: f64,
    /// Of each group: the sums over points of `S_i` and of `T_i`.
    groups: Vec<[f64; 2]>,
}

/// First-order and total indices of a function of inputs that are even on (0, 1).
///
/// ```text
/// S_i = Σ f(B)_j (f(A_B^i)_j − f(A)_j)/(n V),   T_i = Σ (f(A)_j − f(A_B^i)_j)²/(2 n V)
/// ```
///
/// | symbol | quantity |
/// |---|---|
/// | `A`, `B` | two independent samples of n points: halves of the coordinates of one Sobol sequence |
/// | `A_B^i` | A with the coordinates of group i from B |
/// | `V` | variance over A and B |
///
/// The interval is Student's over 16 independent scramblings. A constant function has no indices:
/// their values are not numbers. `room` makes what one thread needs.
///
/// Valid: inputs or groups of inputs that are independent.
/// Source: Saltelli et al. 2010, Comput. Phys. Commun. 181, 259, table 2 (b) and (f); the latter is
/// Jansen 1999, Comput. Phys. Commun. 117, 35; both from memory.
/// Checked: `ishigami_has_its_published_indices`, `g_function_has_its_analytic_indices`.
pub fn indices<R, E: Send>(
    bases: &Bases,
    room: impl Fn() -> R + Sync,
    function: impl Fn(&[f64], &mut R) -> Result<f64, E> + Sync,
) -> Result<Vec<Index>, E> {
    let centre = function(&vec![0.5; bases.inputs], &mut room())?;
    let parts = (0..SCRAMBLES)
        .map(|scramble| {
            part((bases, scramble), &room, |point, room| {
                Ok(function(point, room)? - centre)
            })
        })
        .collect::<Result<Vec<Sums>, E>>()?;
    let mut whole = Sums::of(bases.groups.len());
    for each in &parts {
        whole.add(each);
    }
    let share = |group: usize, of: fn(&Sums, usize) -> f64| {
        let count = SCRAMBLES as f64;
        let each: Vec<f64> = parts.iter().map(|part| of(part, group)).collect();
        let mean = each.iter().sum::<f64>() / count;
        let squares: f64 = each.iter().map(|each| (each - mean).powi(2)).sum();
        Share {
            value: of(&whole, group),
            confidence: STUDENT * (squares / (count - 1.0) / count).sqrt(),
        }
    };
    Ok((0..bases.groups.len())
        .map(|group| Index {
            first: share(group, Sums::first),
            total: share(group, Sums::total),
        })
        .collect())
}

/// The sums of one scrambling.
fn part<R, E: Send>(
    (bases, scramble): (&Bases, usize),
    room: &(impl Fn() -> R + Sync),
    function: impl Fn(&[f64], &mut R) -> Result<f64, E> + Sync,
) -> Result<Sums, E> {
    let count = bases.points as usize;
    let size = count / SCRAMBLES + usize::from(scramble < count % SCRAMBLES);
    let sobol = Sobol::replicate(2 * bases.inputs, bases.seed, scramble);
    let starts: Vec<usize> = (0..size).step_by(TOGETHER).collect();
    let done = starts
        .par_iter()
        .map_init(room, |room, start| {
            let mut walk = sobol.walk(*start as u32);
            let mut both = vec![0.0; 2 * bases.inputs];
            let mut mixed = vec![0.0; bases.inputs];
            let mut sums = Sums::of(bases.groups.len());
            for _ in 0..TOGETHER.min(size - start) {
                walk.next_into(&mut both);
                let (a, b) = both.split_at(bases.inputs);
                let [at_a, at_b] = [function(a, room)?, function(b, room)?];
                sums.points += 1.0;
                sums.value += at_a + at_b;
                sums.square += at_a * at_a + at_b * at_b;
                for (group, own) in bases.groups.iter().zip(&mut sums.groups) {
                    mixed.copy_from_slice(a);
                    for input in group {
                        mixed[*input] = b[*input];
                    }
                    let at_mixed = function(&mixed, room)?;
                    own[0] += at_b * (at_mixed - at_a);
                    own[1] += (at_a - at_mixed).powi(2);
                }
            }
            Ok(sums)
        })
        .collect::<Result<Vec<Sums>, E>>()?;
    let mut whole = Sums::of(bases.groups.len());
    for sums in &done {
        whole.add(sums);
    }
    Ok(whole)
}

impl Sums {
    fn of(groups: usize) -> Self {
        Self {
            points: 0.0,
            value: 0.0,
            square: 0.0,
            groups: vec![[0.0; 2]; groups],
        }
    }

    fn add(&mut self, other: &Self) {
        self.points += other.points;
        self.value += other.value;
        self.square += other.square;
        for (sums, more) in self.groups.iter_mut().zip(&other.groups) {
            sums[0] += more[0];
            sums[1] += more[1];
        }
    }

    fn variance(&self) -> f64 {
        let mean = self.value / (2.0 * self.points);
        self.square / (2.0 * self.points) - mean * mean
    }

    fn first(&self, group: usize) -> f64 {
        self.groups[group][0] / self.points / self.variance()
    }

    fn total(&self, group: usize) -> f64 {
        self.groups[group][1] / (2.0 * self.points) / self.variance()
    }
}

#[cfg(test)]
mod tests {
    use std::{convert::Infallible, f64::consts::PI};

    use super::*;

    fn alone(inputs: usize) -> Vec<Vec<usize>> {
        (0..inputs).map(|input| vec![input]).collect()
    }

    fn found(bases: Bases, function: impl Fn(&[f64]) -> f64 + Sync) -> Vec<Index> {
        let Ok(indices) = indices(
            &bases,
            || (),
            |point, ()| Ok::<f64, Infallible>(function(point)),
        );
        indices
    }

    /// Holds the indices of forty seeds against the true ones: about 95 of 100 lie within their own
    /// confidence, none beyond three of it, and the confidence is small.
    ///
    /// The indices of one seed err together, so that a hundred are worth some forty: two standard
    /// deviations of forty independent ones are 7 %.
    fn hold(
        wanted: &[[f64; 2]],
        (points, most): (u32, f64),
        function: impl Fn(&[f64]) -> f64 + Sync,
    ) {
        let (mut held, mut all) = (0, 0);
        let groups = alone(wanted.len());
        for seed in 0..40 {
            let bases = Bases {
                inputs: wanted.len(),
                groups: &groups,
                points,
                seed,
            };
            for (index, wanted) in found(bases, &function).iter().zip(wanted) {
                for (share, wanted) in [index.first, index.total].iter().zip(wanted) {
                    let off = (share.value - wanted).abs();
                    held += usize::from(off <= share.confidence);
                    all += 1;
                    assert!(off <= 3.0 * share.confidence, "{seed}: {share:?} {wanted}");
                    assert!(share.confidence < most, "{seed}: {share:?}");
                }
            }
        }
        let rate = held as f64 / f64::from(all);
        assert!((0.88..=1.0).contains(&rate), "{rate}");
    }

    // f = sin x₁ + a sin² x₂ + b x₃⁴ sin x₁ on (−π, π)³. By integration
    // V₁ = ½ (1 + b π⁴/5)², V₂ = a²/8, V₁₃ = b² π⁸ (1/18 − 1/50), all others nothing: the shares
    // published for a = 7, b = 0.1 are 0.3139, 0.4424, 0 and in total 0.5576, 0.4424, 0.2437
    // (Ishigami & Homma 1990; digits from memory).
    #[test]
    fn ishigami_has_its_published_indices() {
        let (a, b) = (7.0, 0.1);
        let parts = [
            0.5 * (1.0 + b * PI.powi(4) / 5.0).powi(2),
            a * a / 8.0,
            b * b * PI.powi(8) * (1.0 / 18.0 - 1.0 / 50.0),
        ];
        let whole: f64 = parts.iter().sum();
        let [one, two, both] = parts.map(|part| part / whole);
        let wanted = [[one, one + both], [two, two], [0.0, both]];
        for (share, published) in [
            (one, 0.3139),
            (two, 0.4424),
            (one + both, 0.5576),
            (both, 0.2437),
        ] {
            // Half a unit of the last published digit.
            assert!((share - published).abs() < 5e-5, "{share} {published}");
        }
        hold(&wanted, (4096, 0.08), |u| {
            let [x, y, z] = [0, 1, 2].map(|at| PI * (2.0 * u[at] - 1.0));
            x.sin() + a * y.sin().powi(2) + b * z.powi(4) * x.sin()
        });
    }

    // f = Π (|4u − 2| + a)/(1 + a): V_i = 1/(3 (1 + a_i)²), V = Π (1 + V_i) − 1,
    // S_i = V_i/V, T_i = V_i Π_{j≠i} (1 + V_j)/V (Saltelli & Sobol 1995, from memory; derived here from
    // the variance of |4u − 2|, which is ⅓).
    #[test]
    fn g_function_has_its_analytic_indices() {
        let a: [f64; 6] = [0.0, 0.5, 3.0, 9.0, 99.0, 99.0];
        let own = a.map(|a| 1.0 / (3.0 * (1.0 + a).powi(2)));
        let product: f64 = own.iter().map(|own| 1.0 + own).product();
        let whole = product - 1.0;
        let wanted = own.map(|own| [own / whole, own * product / (1.0 + own) / whole]);
        hold(&wanted, (4096, 0.08), |u| {
            let terms = u.iter().zip(a);
            terms
                .map(|(u, a)| ((4.0 * u - 2.0).abs() + a) / (1.0 + a))
                .product()
        });
    }

    // Linear: S = T = c²/Σc², to within the confidence, also for a number of points that is not a
    // power of two; an input that does nothing has nothing, exactly in total.
    #[test]
    fn a_sum_has_the_shares_of_its_terms() {
        let sum = |u: &[f64]| 3.0 * u[0] + 4.0 * u[1] + 1e6;
        hold(&[[0.36, 0.36], [0.64, 0.64]], (10_007, 0.02), sum);
        let bases = Bases {
            inputs: 3,
            groups: &alone(3),
            points: 10_007,
            seed: 3,
        };
        let idle = found(bases, sum)[2];
        assert!(idle.total.value.abs() < f64::EPSILON, "{idle:?}");
    }

    // Linear: the shares of a group are the sums of those of its members, here 9 + 16 and 144 of 169.
    #[test]
    fn a_group_has_the_shares_of_its_members() {
        let groups = [vec![0, 2], vec![1]];
        let bases = Bases {
            inputs: 3,
            groups: &groups,
            points: 16_384,
            seed: 5,
        };
        let indices = found(bases, |u| 3.0 * u[0] + 12.0 * u[1] + 4.0 * u[2]);
        for (index, wanted) in indices.iter().zip([25.0 / 169.0, 144.0 / 169.0]) {
            for share in [index.first, index.total] {
                assert!(share.confidence < 0.02, "{share:?}");
                let off = (share.value - wanted).abs();
                assert!(off <= 3.0 * share.confidence, "{share:?} {wanted}");
            }
        }
    }

    #[test]
    fn a_constant_has_no_indices() {
        let bases = Bases {
            inputs: 2,
            groups: &alone(2),
            points: 256,
            seed: 1,
        };
        assert!(found(bases, |_| 5.0)[0].first.value.is_nan());
    }
}
