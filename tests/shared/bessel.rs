//! Modified Bessel functions, for closed forms of fins.

use std::f64::consts::PI;

/// Modified Bessel functions of the first and of the second kind, by quadrature of their integral forms.
pub fn bessel(order: f64, x: f64) -> [f64; 2] {
    const STEPS: u32 = 4000;
    let mut sums = [0.0; 2];
    for step in 0..STEPS {
        let s = (f64::from(step) + 0.5) / f64::from(STEPS);
        let angle = PI * s;
        sums[0] += (x * angle.cos()).exp() * (order * angle).cos() / f64::from(STEPS);
        let u = 12.0 * s;
        sums[1] += (-x * u.cosh()).exp() * (order * u).cosh() * 12.0 / f64::from(STEPS);
    }
    sums
}
