//! Integrals over an interval, with their error.

use std::f64::consts::PI;

/// An integral and the estimate of its error.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Integral {
    /// Value.
    pub value: f64,
    /// Estimated absolute error; at least the rounding of the sum.
    pub error: f64,
}

/// Nodes of the fifteen-point Kronrod rule on [0, 1] from the end inwards, zero last. Every second
/// node is one of the seven-point Gauss rule.
const NODES: [f64; 8] = [
    0.9914553711208126,
    0.9491079123427585,
    0.8648644233597691,
    0.7415311855993945,
    0.5860872354676911,
    0.4058451513773972,
    0.20778495500789848,
    0.0,
];

/// Kronrod weights of [`NODES`].
const KRONROD: [f64; 8] = [
    0.022935322010529224,
    0.06309209262997856,
    0.10479001032225019,
    0.14065325971552592,
    0.1690047266392679,
    0.19035057806478542,
    0.20443294007529889,
    0.20948214108472782,
];

/// Gauss weights of every second one of [`NODES`].
const GAUSS: [f64; 4] = [
    0.1294849661688697,
    0.27970539148927664,
    0.3818300505051189,
    0.4179591836734694,
];

/// Pieces beyond which the integral stops refining; the error tells what is missing.
const PIECES: usize = 2000;

/// Integral of `f` over the intervals between `breaks`, to `relative` of its value.
///
/// Gauss–Kronrod with 7 and 15 points; the piece with the largest error is halved until the sum
/// of errors is below `relative · |value|`, no piece can be halved, or 2000 pieces are reached:
/// read `error`,
/// which is infinite when the value is not finite. Put the kinks and singular ends of `f` among the breaks. The end points
/// themselves are never evaluated.
///
/// Source: Piessens et al. 1983, QUADPACK, nodes, weights and error rule from memory.
/// Checked: `polynomial_of_degree_22_is_exact`, `error_bounds_the_truth`.
pub fn adaptive(f: impl Fn(f64) -> f64, breaks: &[f64], relative: f64) -> Integral {
    let mut pieces: Vec<Piece> = breaks
        .windows(2)
        .map(|ends| Piece::of(&f, ends[0], ends[1]))
        .collect();
    loop {
        let value: f64 = pieces.iter().map(|piece| piece.value).sum();
        if !value.is_finite() {
            let error = f64::INFINITY;
            return Integral { value, error };
        }
        let error: f64 = pieces.iter().map(|piece| piece.error).sum();
        let worst = (0..pieces.len())
            .filter(|&at| pieces[at].error > pieces[at].rounding)
            .max_by(|&a, &b| pieces[a].error.total_cmp(&pieces[b].error));
        let (Some(worst), false) = (worst, error <= relative * value.abs()) else {
            return Integral { value, error };
        };
        let Piece { low, high, .. } = pieces[worst];
        let middle = 0.5 * (low + high);
        if pieces.len() >= PIECES || middle <= low.min(high) || middle >= low.max(high) {
            return Integral { value, error };
        }
        pieces[worst] = Piece::of(&f, low, middle);
        pieces.push(Piece::of(&f, middle, high));
    }
}

/// Nodes and weights of the Gauss–Legendre rule of `order` points on [−1, 1], nodes rising.
///
/// Exact for polynomials up to degree `2 · order − 1`. Newton's method on the recurrence of the
/// Legendre polynomials; nodes and weights to a few units in the last place.
///
/// Checked: `gauss_legendre_is_exact_to_its_degree`.
pub fn gauss_legendre(order: usize) -> Vec<(f64, f64)> {
    let mut rule = vec![(0.0, 0.0); order];
    for index in 0..order.div_ceil(2) {
        let angle = PI * (index as f64 + 0.75) / (order as f64 + 0.5);
        let mut node = angle.cos();
        for _ in 0..8 {
            let (value, slope) = legendre(order, node);
            node -= value / slope;
        }
        if 2 * index + 1 == order {
            node = 0.0;
        }
        let slope = legendre(order, node).1;
        let weight = 2.0 / ((1.0 - node * node) * slope * slope);
        rule[index] = (-node, weight);
        rule[order - 1 - index] = (node, weight);
    }
    rule
}

/// Legendre polynomial and its derivative, |x| < 1.
fn legendre(order: usize, x: f64) -> (f64, f64) {
    let (mut before, mut value) = (1.0, x);
    for degree in 2..=order {
        let n = degree as f64;
        (before, value) = (
            value,
            ((2.0 * n - 1.0) * x * value - (n - 1.0) * before) / n,
        );
    }
    (value, order as f64 * (x * value - before) / (x * x - 1.0))
}

struct Piece {
    low: f64,
    high: f64,
    value: f64,
    error: f64,
    rounding: f64,
}

impl Piece {
    fn of(f: &impl Fn(f64) -> f64, low: f64, high: f64) -> Self {
        let (centre, half) = (0.5 * (low + high), 0.5 * (high - low));
        let mut samples = [0.0; 15];
        for (at, node) in NODES.iter().enumerate() {
            samples[at] = f(centre - half * node);
            samples[14 - at] = f(centre + half * node);
        }
        let weight = |at: usize| KRONROD[at.min(14 - at)];
        let sum = |g: &dyn Fn(f64) -> f64| -> f64 {
            (0..15).map(|at| weight(at) * g(samples[at])).sum::<f64>()
        };
        let kronrod = sum(&|y| y);
        let gauss: f64 = (1..14)
            .step_by(2)
            .map(|at| GAUSS[at.min(14 - at) / 2] * samples[at])
            .sum();
        let magnitude = half.abs() * sum(&f64::abs);
        let spread = half.abs() * sum(&|y| (y - 0.5 * kronrod).abs());
        let difference = (half * (kronrod - gauss)).abs();
        let rounding = 50.0 * f64::EPSILON * magnitude;
        // The difference of the two rules overstates the error of the better one by far.
        let scaled = if spread > 0.0 {
            spread * (200.0 * difference / spread).powf(1.5).min(1.0)
        } else {
            difference
        };
        Self {
            low,
            high,
            value: half * kronrod,
            error: scaled.max(rounding),
            rounding,
        }
    }
}

#[cfg(test)]
#[expect(clippy::float_cmp, reason = "these results are exact")]
mod tests {
    use super::*;

    // Rounding only: a wrong digit in any node or weight shows here.
    #[test]
    fn polynomial_of_degree_22_is_exact() {
        for degree in 0..=22 {
            let piece = Piece::of(&|x: f64| x.powi(degree), -0.5, 1.0);
            let n = f64::from(degree) + 1.0;
            let exact = (1.0 - (-0.5f64).powf(n)) / n;
            assert!((piece.value - exact).abs() < 3e-16, "degree {degree}");
        }
        let weights: f64 = GAUSS.iter().sum::<f64>() * 2.0 - GAUSS[3];
        assert!((weights - 2.0).abs() < 1e-15);
    }

    #[test]
    fn error_bounds_the_truth() {
        type Case<'a> = (fn(f64) -> f64, &'a [f64], f64);
        let cases: [Case; 5] = [
            (|x| x.exp(), &[0.0, 1.0], 1f64.exp() - 1.0),
            (f64::sqrt, &[0.0, 1.0], 2.0 / 3.0),
            (|x| (x - 0.3).abs(), &[0.0, 0.3, 1.0], 0.29),
            (|x| (x - 0.3).abs(), &[0.0, 1.0], 0.29),
            (
                |x| 1.0 / (1e-4 + x * x),
                &[-1.0, 1.0],
                200.0 * 100f64.atan(),
            ),
        ];
        for (at, (f, breaks, exact)) in cases.into_iter().enumerate() {
            let found = adaptive(f, breaks, 1e-11);
            let miss = (found.value - exact).abs();
            assert!(miss <= found.error, "case {at}: {miss:e} {:e}", found.error);
            assert!(found.error <= 1e-11 * exact.abs(), "case {at}");
        }
    }

    #[test]
    fn reversed_interval_changes_the_sign() {
        let found = adaptive(|x| x, &[2.0, 0.0], 1e-12);
        assert!((found.value + 2.0).abs() < 1e-14);
    }

    #[test]
    fn divergent_integral_reports_its_error() {
        let found = adaptive(|x: f64| x.powf(-1.5), &[0.0, 1.0], 1e-10);
        assert_eq!(found.error, f64::INFINITY);
        assert_eq!(adaptive(|x| x, &[], 1e-10).value, 0.0);
        assert!(adaptive(|_| f64::NAN, &[0.0, 1.0], 1e-10).value.is_nan());
    }

    // 1e-14: sums of at most 64 terms of order one.
    #[test]
    fn gauss_legendre_is_exact_to_its_degree() {
        for order in [1, 2, 3, 5, 8, 21, 64] {
            let rule = gauss_legendre(order);
            assert!(rule.windows(2).all(|pair| pair[0].0 < pair[1].0));
            for degree in [0, order, 2 * order - 2, 2 * order - 1] {
                let sum: f64 = rule.iter().map(|(x, w)| w * x.powi(degree as i32)).sum();
                let exact = if degree % 2 == 0 {
                    2.0 / (degree as f64 + 1.0)
                } else {
                    0.0
                };
                assert!((sum - exact).abs() < 1e-14, "order {order} degree {degree}");
            }
        }
    }
}
