//! Closing in on a minimum of one variable, one trial at a time.

/// Least step from the middle and from the ends, as a share of the bracket.
const LEAST_STEP: f64 = 0.04;
/// Longer half over the shorter one above which the parabola is not asked.
const LOPSIDED: f64 = 5.0;
/// Share of the longer half that golden section takes.
const GOLDEN: f64 = 0.381_966;

/// Where to look next for a minimum between the ends of three points `(x, y)` with x rising and
/// the middle one lowest.
///
/// ```text
/// x = b − ½ ((b − a)² (f_b − f_c) − (b − c)² (f_b − f_a))/((b − a) (f_b − f_c) − (b − c) (f_b − f_a))
/// ```
///
/// The vertex of the parabola through them, or golden section of the longer half where they have
/// none inside or the halves are very unlike. Never on one of the points. The caller evaluates there and narrows the bracket.
///
/// Source: successive parabolic interpolation (Brent 1973, chapter 5; from memory).
/// Checked: `trials_close_in_on_a_minimum`, `a_trial_lies_inside_and_on_no_point`.
pub fn next_trial([(a, low), (b, middle), (c, high)]: [(f64, f64); 3]) -> f64 {
    let width = c - a;
    let step = LEAST_STEP * width;
    let longer = if c - b > b - a { 1.0 } else { -1.0 };
    let (left, right) = ((b - a) * (middle - high), (b - c) * (middle - low));
    let vertex = b - 0.5 * ((b - a) * left - (b - c) * right) / (left - right);
    let halves = [b - a, c - b];
    let [shorter, half] = [halves[0].min(halves[1]), halves[0].max(halves[1])];
    // Negated, so that a vertex that is not a number counts as outside. Beside a middle that sits at
    // one end a parabola creeps, for it hardly knows the other half.
    if !(a < vertex && vertex < c) || half > LOPSIDED * shorter {
        return b + longer * GOLDEN * half;
    }
    let vertex = vertex.clamp(a + 0.5 * step, c - 0.5 * step);
    if (vertex - b).abs() < 0.5 * step {
        b + longer * 0.5 * step
    } else {
        vertex
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn trials_close_in_on_a_minimum() {
        let f = |x: f64| x + 1.0 / x;
        let mut bracket = [0.2, 2.0, 5.0].map(|x| (x, f(x)));
        for _ in 0..10 {
            let [left, middle, right] = bracket;
            let x = next_trial(bracket);
            let tried = (x, f(x));
            bracket = match (x < middle.0, tried.1 < middle.1) {
                (true, true) => [left, tried, middle],
                (true, false) => [tried, middle, right],
                (false, true) => [middle, tried, right],
                (false, false) => [left, middle, tried],
            };
        }
        // Ten trials on a curve that is lowest at one; steps shrink with the bracket.
        assert!((bracket[1].0 - 1.0).abs() < 0.02, "{bracket:?}");
        assert!((bracket[1].1 - 2.0).abs() < 1e-3, "{bracket:?}");
    }

    #[test]
    fn a_trial_lies_inside_and_on_no_point() {
        for bracket in [
            [(0.0, 1.0), (1.0, 0.0), (2.0, 1.0)],
            [(0.0, 1.0), (1.0, 1.0), (2.0, 1.0)],
            [(0.0, 1.0), (1e-9, 0.0), (2.0, 5.0)],
            [(0.0, f64::INFINITY), (1.0, 0.0), (2.0, 1.0)],
        ] {
            let x = next_trial(bracket);
            assert!(0.0 < x && x < 2.0, "{x} of {bracket:?}");
            assert!(
                bracket.iter().all(|point| (point.0 - x).abs() > 1e-12),
                "{bracket:?}"
            );
        }
    }
}
