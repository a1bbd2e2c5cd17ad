//! Interpolation in a table of points.

/// Straight line between neighbouring points; outside the table its end value.
///
/// The points are `(x, y)` with x rising. The caller knows the range of his table: leaving it is
/// a matter of physics, not of arithmetic. An empty table and a `NaN` give `NaN`.
///
/// Checked: `line_is_reproduced`, `ends_are_held`.
pub fn linear(points: &[(f64, f64)], x: f64) -> f64 {
    between(points, x, |[(x0, y0), (x1, y1)]| {
        y0 + (y1 - y0) * (x - x0) / (x1 - x0)
    })
}

/// Power law `y = c xⁿ` between neighbouring points; outside the table its end value.
///
/// A segment that starts at or below zero, in x or in y, has no logarithm and is drawn straight.
/// Otherwise as [`linear`].
///
/// Checked: `power_law_is_reproduced`, `segment_from_zero_is_straight`.
pub fn log_log(points: &[(f64, f64)], x: f64) -> f64 {
    between(points, x, |[(x0, y0), (x1, y1)]| {
        if x0 > 0.0 && y0 > 0.0 && y1 > 0.0 {
            let share = (x / x0).ln() / (x1 / x0).ln();
            y0 * ((y1 / y0).ln() * share).exp()
        } else {
            y0 + (y1 - y0) * (x - x0) / (x1 - x0)
        }
    })
}

fn between(points: &[(f64, f64)], x: f64, inside: impl Fn([(f64, f64); 2]) -> f64) -> f64 {
    let (Some(first), Some(last)) = (points.first(), points.last()) else {
        return f64::NAN;
    };
    if x.is_nan() {
        return f64::NAN;
    }
    let above = points.partition_point(|point| point.0 <= x);
    match above {
        0 => first.1,
        above if above == points.len() => last.1,
        above => inside([points[above - 1], points[above]]),
    }
}

#[cfg(test)]
#[expect(clippy::float_cmp, reason = "these results are exact")]
mod tests {
    use super::*;

    const TABLE: [(f64, f64); 3] = [(1.0, 3.0), (2.0, 5.0), (4.0, 9.0)];

    #[test]
    fn line_is_reproduced() {
        for x in [1.0, 1.3, 2.0, 3.9, 4.0] {
            assert!((linear(&TABLE, x) - (1.0 + 2.0 * x)).abs() < 1e-14);
        }
    }

    #[test]
    fn ends_are_held() {
        assert_eq!((linear(&TABLE, 0.0), linear(&TABLE, 9.0)), (3.0, 9.0));
        assert_eq!((log_log(&TABLE, 0.0), log_log(&TABLE, 9.0)), (3.0, 9.0));
        assert!(linear(&TABLE, f64::NAN).is_nan());
        assert!(linear(&[], 1.0).is_nan());
        assert_eq!(log_log(&[(1.0, 7.0)], 5.0), 7.0);
    }

    // 1e-14: three logarithms and one exponential of numbers near one.
    #[test]
    fn power_law_is_reproduced() {
        let law = |x: f64| 2.0 * x.powf(-0.95);
        let points = [(1e4, law(1e4)), (1e5, law(1e5)), (1e7, law(1e7))];
        for x in [1e4, 3e4, 1e5, 5e6] {
            assert!((log_log(&points, x) / law(x) - 1.0).abs() < 1e-14);
        }
    }

    #[test]
    fn segment_from_zero_is_straight() {
        assert_eq!(log_log(&[(0.0, 4.0), (2.0, 1.0)], 1.0), 2.5);
    }
}
