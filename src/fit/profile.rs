//! Likelihood over the range of an unknown: its top, its interval, and whether it says anything.

use crate::{
    fit::likelihood::{Likelihood, Target},
    numerics::test_statistics::chi_squared_tail,
};

/// Points at which a profile is read.
const GRID: usize = 2001;

/// How the range of an unknown is walked.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Walk {
    /// In even steps.
    Even,
    /// In even factors.
    Factors,
}

/// The range of an unknown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Range {
    /// Lower end.
    pub from: f64,
    /// Upper end.
    pub to: f64,
    /// How it is walked.
    pub walk: Walk,
}

impl Range {
    /// A range; walked in factors where both ends lie on one side of zero and far apart.
    pub fn new(from: f64, to: f64) -> Self {
        let walk = if from > 0.0 && to >= 2.0 * from {
            Walk::Factors
        } else {
            Walk::Even
        };
        Self { from, to, walk }
    }

    /// The value a share of the way along.
    pub fn at(&self, share: f64) -> f64 {
        match self.walk {
            // Exact at both ends, where a field may have its limit.
            _ if share <= 0.0 => self.from,
            _ if share >= 1.0 => self.to,
            Walk::Even => self.from + share * (self.to - self.from),
            Walk::Factors => self.from * (self.to / self.from).powf(share),
        }
    }
}

/// A model at values of its unknown, and between them.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Curve {
    /// (share of the way along the range; ln conductance by load), rising.
    nodes: Vec<(f64, Vec<f64>)>,
}

impl Curve {
    /// Takes in a value of the model.
    pub fn insert(&mut self, share: f64, model: Vec<f64>) {
        let place = self.nodes.partition_point(|node| node.0 < share);
        self.nodes.insert(place, (share, model));
    }

    /// The model at the shares it was solved for.
    pub fn nodes(&self) -> &[(f64, Vec<f64>)] {
        &self.nodes
    }

    /// Whether the model was solved here, within a step of the grid.
    pub fn has(&self, share: f64) -> bool {
        let near = |node: &(f64, Vec<f64>)| (node.0 - share).abs() < 1.0 / GRID as f64;
        self.nodes.iter().any(near)
    }

    /// The model in between: cubics with the slopes of parabolas through three neighbours.
    pub fn at(&self, share: f64) -> Vec<f64> {
        let last = self.nodes.len() - 1;
        let right = self
            .nodes
            .partition_point(|node| node.0 < share)
            .clamp(1, last);
        let ((x0, y0), (x1, y1)) = (&self.nodes[right - 1], &self.nodes[right]);
        let step = x1 - x0;
        let t = (share - x0) / step;
        (0..y0.len())
            .map(|level| {
                let slopes = [right - 1, right].map(|node| step * self.slope(node, level));
                let (a, b) = (y0[level], y1[level]);
                let hermite = t * t * (3.0 - 2.0 * t);
                a + hermite * (b - a) + t * (1.0 - t) * ((1.0 - t) * slopes[0] - t * slopes[1])
            })
            .collect()
    }

    /// Slope at a node of the parabola through it and its neighbours.
    fn slope(&self, node: usize, level: usize) -> f64 {
        let last = self.nodes.len() - 1;
        let middle = node.clamp(1, last.max(2) - 1);
        if last < 2 {
            return (self.nodes[1].1[level] - self.nodes[0].1[level])
                / (self.nodes[1].0 - self.nodes[0].0);
        }
        let [a, b, c] = [middle - 1, middle, middle + 1].map(|at| &self.nodes[at]);
        let left = (b.1[level] - a.1[level]) / (b.0 - a.0);
        let right = (c.1[level] - b.1[level]) / (c.0 - b.0);
        let bend = (right - left) / (c.0 - a.0);
        left + bend * (2.0 * self.nodes[node].0 - a.0 - b.0)
    }
}

/// How far readings fix an unknown.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Verdict {
    /// On both sides.
    Determined,
    /// It is not less than the lower end.
    BelowOnly,
    /// It is not more than the upper end.
    AboveOnly,
    /// On neither.
    Undetermined,
}

/// A profile of the likelihood.
#[derive(Clone, Debug, PartialEq)]
pub struct Profile {
    /// (share of the way along the range; −2 ln L above its least).
    pub curve: Vec<(f64, f64)>,
    /// Share of the likeliest value.
    pub best: f64,
    /// Shares between which the value lies with 90 % confidence, the outermost where they fall apart.
    pub interval: [f64; 2],
    /// Number of separate intervals.
    pub pieces: usize,
    /// How far the readings fix it.
    pub verdict: Verdict,
    /// Change of ln conductance over the whole range, mean of all loads.
    pub movement: f64,
    /// Σ of squared misses at the best value, each over its standard deviation, all inputs counted.
    pub chi_squared: f64,
    /// Chance of more, 0 to 1; none for a single reading or where the readings told their scatter.
    pub chance: Option<f64>,
}

impl Profile {
    /// The profile of a model under a likelihood.
    ///
    /// ```text
    /// interval = {θ: −2 ln L(θ) ≤ least + t²},   t the 95 % quantile of N(0, 1), or of Student's t
    /// ```
    ///
    /// where the scatter was found from the readings. Valid: an unknown that the readings fix inside its range; ends of the
    /// range are told as ends. Source: Wilks 1938, from memory.
    /// Checked: `marginal_interval_is_that_of_the_linear_gaussian_case`,
    /// `a_known_roughness_is_recovered_in_nine_of_ten` in `tests/fit.rs`.
    pub fn of(model: &Curve, likelihood: &Likelihood, target: &Target) -> Self {
        let shares = (0..GRID).map(|at| at as f64 / (GRID - 1) as f64);
        let mut curve = Vec::with_capacity(GRID);
        let mut means = Vec::with_capacity(GRID);
        for share in shares {
            let levels = model.at(share);
            means.push(levels.iter().sum::<f64>() / levels.len() as f64);
            curve.push((share, likelihood.deviance(&levels)));
        }
        let least = curve
            .iter()
            .copied()
            .min_by(|one, other| one.1.total_cmp(&other.1))
            .unwrap_or((0.0, 0.0));
        for point in &mut curve {
            point.1 -= least.1;
        }
        let ends = crossings(&curve, likelihood.threshold);
        let interval = [
            ends.first().map_or(0.0, |piece| piece[0]),
            ends.last().map_or(1.0, |piece| piece[1]),
        ];
        let extent = |pick: fn(f64, f64) -> f64, from: f64| means.iter().copied().fold(from, pick);
        let freedom = target.values.len() as f64 - 1.0;
        Self {
            best: least.0,
            verdict: match (interval[0] <= 0.0, interval[1] >= 1.0) {
                (false, false) => Verdict::Determined,
                (false, true) => Verdict::BelowOnly,
                (true, false) => Verdict::AboveOnly,
                (true, true) => Verdict::Undetermined,
            },
            interval,
            pieces: ends.len(),
            movement: extent(f64::max, f64::NEG_INFINITY) - extent(f64::min, f64::INFINITY),
            chi_squared: least.1,
            chance: (freedom > 0.0 && target.deviations.is_some())
                .then(|| chi_squared_tail(least.1, freedom)),
            curve,
        }
    }
}

/// Where the curve lies below a height: the ends of every piece, straight between points.
fn crossings(curve: &[(f64, f64)], height: f64) -> Vec<[f64; 2]> {
    let mut pieces: Vec<[f64; 2]> = Vec::new();
    let mut open = None;
    if let Some(first) = curve.first().filter(|first| first.1 <= height) {
        open = Some(first.0);
    }
    for pair in curve.windows(2) {
        let ((x0, y0), (x1, y1)) = (pair[0], pair[1]);
        let cross = x0 + (x1 - x0) * (height - y0) / (y1 - y0);
        match (y0 <= height, y1 <= height) {
            (false, true) => open = Some(cross),
            (true, false) => pieces.extend(open.take().map(|start| [start, cross])),
            _ => {}
        }
    }
    if let (Some(start), Some(last)) = (open, curve.last()) {
        pieces.push([start, last.0]);
    }
    pieces
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fit::likelihood::Nuisance;
    use nalgebra::DMatrix;

    fn straight(levels: usize) -> Curve {
        let mut curve = Curve::default();
        for at in 0..21 {
            let share = f64::from(at) / 20.0;
            curve.insert(share, vec![2.0 * share; levels]);
        }
        curve
    }

    /// Readings `d = 2 θ + z + e`, z shared: the interval is `mean ± 1.645 √(σ²/n + τ²)` over 2.
    #[test]
    fn marginal_interval_is_that_of_the_linear_gaussian_case() {
        let target = Target {
            values: vec![0.93, 1.05, 1.02],
            levels: vec![0; 3],
            deviations: Some(vec![0.1; 3]),
        };
        let (sigma, tau) = (0.1_f64, 0.07_f64);
        let nuisance = Nuisance {
            offset: vec![0.02],
            covariance: DMatrix::from_element(1, 1, tau * tau),
        };
        let likelihood = Likelihood::of(&target, &nuisance, None).unwrap();
        let found = Profile::of(&straight(1), &likelihood, &target);
        let wide = 1.644_853_627 * (sigma * sigma / 3.0 + tau * tau).sqrt() / 2.0;
        let middle = (1.0 - 0.02) / 2.0;
        // The grid is 1/2000 fine; the interval is read between its points.
        assert!((found.best - middle).abs() < 5e-4, "{}", found.best);
        for (end, expected) in found.interval.iter().zip([middle - wide, middle + wide]) {
            assert!((end - expected).abs() < 2e-4, "{end} {expected}");
        }
        assert!((likelihood.whole - (sigma * sigma / 3.0 + tau * tau).sqrt()).abs() < 1e-12);
        assert_eq!(found.verdict, Verdict::Determined);
        // The misses about their mean have two degrees of freedom and no share of τ.
        let own = [0.93_f64, 1.05, 1.02]
            .map(|d| ((d - 1.0) / sigma).powi(2))
            .iter()
            .sum::<f64>();
        assert!(
            (found.chi_squared - own).abs() < 1e-3,
            "{}",
            found.chi_squared
        );
    }

    #[test]
    fn readings_that_say_nothing_are_seen_to() {
        let target = |sd: f64, value: f64| Target {
            values: vec![value],
            levels: vec![0],
            deviations: Some(vec![sd]),
        };
        let verdict = |sd: f64, value: f64| {
            let target = target(sd, value);
            let likelihood = Likelihood::of(&target, &Nuisance::none(1), None).unwrap();
            Profile::of(&straight(1), &likelihood, &target).verdict
        };
        assert_eq!(verdict(5.0, 1.0), Verdict::Undetermined);
        assert_eq!(verdict(0.05, 1.0), Verdict::Determined);
        assert_eq!(verdict(0.05, 1.98), Verdict::BelowOnly);
        assert_eq!(verdict(0.05, 0.01), Verdict::AboveOnly);
    }

    #[test]
    fn smooth_models_are_met_between_the_nodes() {
        let mut curve = Curve::default();
        for at in 0..21 {
            let share = f64::from(at) / 20.0;
            curve.insert(share, vec![(3.0 * share).sin()]);
        }
        for at in 0..200 {
            let share = f64::from(at) / 199.0;
            // Slopes by parabolas: error of third order, (0.05·3)³/24 and a little more at the ends.
            let miss = (curve.at(share)[0] - (3.0 * share).sin()).abs();
            assert!(miss < 4e-4, "{share} {miss}");
        }
    }

    #[test]
    fn a_likelihood_with_two_tops_is_told_in_pieces() {
        let mut curve = Curve::default();
        for at in 0..21 {
            let share = f64::from(at) / 20.0;
            curve.insert(share, vec![(2.0 * share - 1.0).powi(2)]);
        }
        let target = Target {
            values: vec![0.25],
            levels: vec![0],
            deviations: Some(vec![0.05]),
        };
        let likelihood = Likelihood::of(&target, &Nuisance::none(1), None).unwrap();
        assert_eq!(Profile::of(&curve, &likelihood, &target).pieces, 2);
    }
}
