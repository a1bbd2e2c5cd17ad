//! Roots of a function of one variable.

/// Iterations allowed: bisection alone reaches the last bit of any bracket in fewer.
const ITERATIONS: usize = 200;

/// Halvings of a bracket: 2⁻⁶⁰ is 1e-18.
const HALVINGS: usize = 60;

/// A root of `f` between `low` and `high`, to within `tolerance` of the argument.
///
/// Brent's method: inverse quadratic or secant steps where they help, bisection where they do
/// not. None when the ends do not bracket a sign change, or when `f` is not finite on the way.
///
/// Source: Brent 1973, Algorithms for Minimization without Derivatives, chapter 4 (from memory).
/// Checked: `root_of_a_transcendental_function`, `steep_and_flat_functions_converge`.
pub fn bracketed(f: impl Fn(f64) -> f64, low: f64, high: f64, tolerance: f64) -> Option<f64> {
    let mut best = Point::of(&f, high)?;
    let mut previous = Point::of(&f, low)?;
    let mut opposite = previous;
    if best.y == 0.0 {
        return Some(best.x);
    }
    if previous.y == 0.0 {
        return Some(previous.x);
    }
    if best.y.signum() == previous.y.signum() {
        return None;
    }
    let mut step = best.x - previous.x;
    let mut step_before = step;
    for _ in 0..ITERATIONS {
        if best.y.signum() == opposite.y.signum() {
            opposite = previous;
            step = best.x - previous.x;
            step_before = step;
        }
        if opposite.y.abs() < best.y.abs() {
            previous = best;
            best = opposite;
            opposite = previous;
        }
        let reach = 2.0 * f64::EPSILON * best.x.abs() + 0.5 * tolerance;
        let half = 0.5 * (opposite.x - best.x);
        if half.abs() <= reach || best.y == 0.0 {
            return Some(best.x);
        }
        let trial = interpolated(best, previous, opposite);
        let bold = (1.5 * half.abs() - 0.5 * reach).min(0.5 * step_before.abs());
        let towards = trial.signum() == half.signum();
        if step_before.abs() >= reach && trial.is_finite() && towards && trial.abs() < bold {
            step_before = step;
            step = trial;
        } else {
            step = half;
            step_before = half;
        }
        previous = best;
        let moved = if step.abs() > reach {
            step
        } else {
            reach.copysign(half)
        };
        best = Point::of(&f, best.x + moved)?;
    }
    None
}

/// Where `holds` ends between `low`, where it is true, and `high`, where it is not.
///
/// Bisection down to the spacing of f64, or to 1e-18 of the bracket: for functions with steps and flat
/// stretches. `low` or `high` itself where it never ends, or ends at once.
///
/// Checked: `a_bracket_is_halved_down_to_its_last_bit`.
pub fn halved(mut holds: impl FnMut(f64) -> bool, mut low: f64, mut high: f64) -> f64 {
    for _ in 0..HALVINGS {
        let middle = f64::midpoint(low, high);
        if middle <= low || high <= middle {
            break;
        }
        if holds(middle) {
            low = middle;
        } else {
            high = middle;
        }
    }
    f64::midpoint(low, high)
}

#[derive(Clone, Copy)]
struct Point {
    x: f64,
    y: f64,
}

impl Point {
    fn of(f: impl Fn(f64) -> f64, x: f64) -> Option<Self> {
        let y = f(x);
        (x.is_finite() && y.is_finite()).then_some(Self { x, y })
    }
}

/// The step from the best point: secant through two points, inverse quadratic through three.
fn interpolated(best: Point, previous: Point, opposite: Point) -> f64 {
    let s = best.y / previous.y;
    // After a change of side both are the same point, to the bit.
    if previous.x.to_bits() == opposite.x.to_bits() {
        return (opposite.x - best.x) * s / (s - 1.0);
    }
    let q = previous.y / opposite.y;
    let r = best.y / opposite.y;
    let above = s * ((opposite.x - best.x) * q * (q - r) - (best.x - previous.x) * (r - 1.0));
    above / -((q - 1.0) * (r - 1.0) * (s - 1.0))
}

#[cfg(test)]
mod tests {
    use std::cell::Cell;

    use super::*;

    // The tolerance asked for, on a root known to sixteen digits (the Dottie number).
    #[test]
    fn root_of_a_transcendental_function() {
        let calls = Cell::new(0);
        let found = bracketed(
            |x| {
                calls.set(calls.get() + 1);
                x.cos() - x
            },
            0.0,
            1.0,
            1e-14,
        );
        assert!((found.expect("bracketed") - 0.7390851332151607).abs() < 1e-14);
        assert!(calls.get() <= 12, "{} calls", calls.get());
    }

    // One step of f64 at the place; 1e-18 of the bracket where that is zero.
    #[test]
    fn a_bracket_is_halved_down_to_its_last_bit() {
        for place in [0.3, 1.0 / 3.0, 7e-5, 0.999] {
            let found = halved(|x| x < place, 0.0, 1.0);
            assert!(
                (found - place).abs() <= f64::EPSILON * place.max(1e-2),
                "{place}"
            );
        }
        assert!(halved(|_| false, 0.0, 1.0) < 1e-18);
        assert!(halved(|_| true, 0.0, 1.0) > 1.0 - 1e-15);
        let mut calls = 0;
        halved(
            |x| {
                calls += 1;
                x < 0.3
            },
            0.0,
            1.0,
        );
        assert!((52..=56).contains(&calls), "{calls} calls");
    }

    #[test]
    fn steep_and_flat_functions_converge() {
        for (power, low, high) in [(9, -1.0, 4.0), (1, -3.0, 1e6), (3, 5.0, -2.0)] {
            let root = bracketed(|x: f64| (x - 0.3).powi(power), low, high, 1e-10);
            assert!((root.expect("bracketed") - 0.3).abs() < 1e-10, "{power}");
        }
        let step = bracketed(|x: f64| if x < 0.7 { -1e-9 } else { 1e9 }, 0.0, 1.0, 1e-12);
        assert!((step.expect("bracketed") - 0.7).abs() < 1e-12);
    }

    #[test]
    fn root_at_an_end_is_found() {
        assert_eq!(bracketed(|x| x, 0.0, 1.0, 1e-12), Some(0.0));
        assert_eq!(bracketed(|x| x - 1.0, 0.0, 1.0, 1e-12), Some(1.0));
    }

    #[test]
    fn no_bracket_and_no_number_give_none() {
        assert_eq!(bracketed(|x| x * x + 1.0, -1.0, 1.0, 1e-12), None);
        assert_eq!(bracketed(|x| (x - 0.5).ln(), 0.0, 1.0, 1e-12), None);
        assert_eq!(bracketed(|x| x, f64::NAN, 1.0, 1e-12), None);
    }
}
