//! Student's t and chi squared: tails and quantiles.

use crate::numerics::special::normal_quantile;

/// Terms of a series or fraction after which it has converged for every argument asked here.
const MOST_TERMS: usize = 10_000;

/// Relative size of a term that no longer counts.
const SMALL: f64 = 1e-16;

/// Least denominator of a continued fraction.
const TINY: f64 = 1e-300;

/// Above so many degrees of freedom Student's t is the normal distribution to ten digits.
const NORMAL_FROM: f64 = 1e10;

/// Probability that a t with so many degrees of freedom lies farther from zero than `t`.
///
/// ```text
/// P(|T| > t) = I_x(ν/2, ½),   x = ν/(ν + t²)
/// ```
///
/// Source: Abramowitz & Stegun 26.7.1, from memory.
/// Checked: `tails_are_those_of_scipy`.
pub fn student_tails(t: f64, degrees: f64) -> f64 {
    if degrees > NORMAL_FROM {
        return libm::erfc(t.abs() / std::f64::consts::SQRT_2);
    }
    incomplete_beta((0.5 * degrees, 0.5), degrees / (degrees + t * t))
}

/// Quantile of Student's t: the t below which lies the probability `p`.
///
/// An infinite number of degrees gives the normal quantile.
///
/// Checked: `quantiles_invert_the_tails`, `tails_are_those_of_scipy`.
pub fn student_quantile(p: f64, degrees: f64) -> f64 {
    if degrees > NORMAL_FROM {
        return normal_quantile(p);
    }
    let tails = 2.0 * p.min(1.0 - p);
    if tails >= 1.0 {
        return 0.0;
    }
    let (mut low, mut high) = (0.0, 1.0);
    while student_tails(high, degrees) > tails && high < 1e300 {
        low = high;
        high *= 2.0;
    }
    // The tail falls steadily, so halving reaches the last digit.
    for _ in 0..200 {
        let middle = f64::midpoint(low, high);
        if middle <= low || middle >= high {
            break;
        }
        if student_tails(middle, degrees) > tails {
            low = middle;
        } else {
            high = middle;
        }
    }
    f64::midpoint(low, high).copysign(p - 0.5)
}

/// Probability that chi squared with so many degrees of freedom exceeds `x`.
///
/// ```text
/// P(χ² > x) = Γ(ν/2, x/2)/Γ(ν/2)
/// ```
///
/// Source: Abramowitz & Stegun 26.4.19, from memory.
/// Checked: `tails_are_those_of_scipy`.
pub fn chi_squared_tail(x: f64, degrees: f64) -> f64 {
    upper_gamma(0.5 * degrees, 0.5 * x)
}

/// Regularised incomplete beta function `I_x(a, b)` by its continued fraction (Lentz).
fn incomplete_beta((a, b): (f64, f64), x: f64) -> f64 {
    if x <= 0.0 {
        return 0.0;
    }
    if x >= 1.0 {
        return 1.0;
    }
    let front = (libm::lgamma(a + b) - libm::lgamma(a) - libm::lgamma(b)
        + a * x.ln()
        + b * libm::log1p(-x))
    .exp();
    // The fraction converges fast on this side of the mean; the other side follows by symmetry.
    if x < (a + 1.0) / (a + b + 2.0) {
        front * beta_fraction((a, b), x) / a
    } else {
        1.0 - front * beta_fraction((b, a), 1.0 - x) / b
    }
}

fn beta_fraction((a, b): (f64, f64), x: f64) -> f64 {
    let away = |value: f64| if value.abs() < TINY { TINY } else { value };
    let mut c = 1.0;
    let mut d = away(1.0 - (a + b) * x / (a + 1.0)).recip();
    let mut product = d;
    for term in 1..MOST_TERMS {
        let m = term as f64;
        let even = m * (b - m) * x / ((a + 2.0 * m - 1.0) * (a + 2.0 * m));
        let odd = -(a + m) * (a + b + m) * x / ((a + 2.0 * m) * (a + 2.0 * m + 1.0));
        let before = product;
        for step in [even, odd] {
            d = away(1.0 + step * d).recip();
            c = away(1.0 + step / c);
            product *= c * d;
        }
        if (product / before - 1.0).abs() < SMALL {
            break;
        }
    }
    product
}

/// Regularised upper incomplete gamma function Q(a, x): series below a + 1, fraction above.
fn upper_gamma(a: f64, x: f64) -> f64 {
    if x <= 0.0 {
        return 1.0;
    }
    let front = (a * x.ln() - x - libm::lgamma(a)).exp();
    if x < a + 1.0 {
        let (mut term, mut sum) = (a.recip(), a.recip());
        for step in 1..MOST_TERMS {
            term *= x / (a + step as f64);
            sum += term;
            if term < SMALL * sum {
                break;
            }
        }
        return 1.0 - front * sum;
    }
    let away = |value: f64| if value.abs() < TINY { TINY } else { value };
    let mut b = x + 1.0 - a;
    let mut c = TINY.recip();
    let mut d = away(b).recip();
    let mut product = d;
    for step in 1..MOST_TERMS {
        let i = step as f64;
        let numerator = -i * (i - a);
        b += 2.0;
        d = away(numerator * d + b).recip();
        c = away(b + numerator / c);
        product *= c * d;
        if (c * d - 1.0).abs() < SMALL {
            break;
        }
    }
    front * product
}

#[cfg(test)]
mod tests {
    use super::*;

    // SciPy 1.17.1: 2*stats.t.sf(t, ν), stats.t.ppf(p, ν), stats.chi2.sf(x, ν).
    #[test]
    fn tails_are_those_of_scipy() {
        for (t, degrees, tails) in [
            (0.3, 1.0, 8.144528418445154e-01),
            (2.0, 3.0, 1.39325968558843e-1),
            (4.7, 9.0, 1.12017045141986e-3),
            (12.0, 30.0, 5.580185415199261e-13),
        ] {
            let found = student_tails(t, degrees);
            // Log-gamma differences cost a few digits of the last ones.
            assert!((found / tails - 1.0).abs() < 1e-11, "{t} {degrees} {found}");
        }
        for (p, degrees, t) in [
            (0.95, 1.0, 6.313751514675037e+00),
            (0.95, 5.0, 2.015048373333023e+00),
            (0.999, 18.0, 3.610484884825093e+00),
            (0.05, 10.0, -1.812461122811676e+00),
        ] {
            let found = student_quantile(p, degrees);
            assert!((found / t - 1.0).abs() < 1e-11, "{p} {degrees} {found}");
        }
        for (x, degrees, tail) in [
            (0.5, 1.0, 4.795001221869534e-01),
            (2.706, 1.0, 9.997137812525883e-02),
            (20.0, 8.0, 1.033605067592573e-02),
            (3.0, 8.0, 9.343575456215499e-01),
            (90.0, 60.0, 7.337199297796568e-03),
        ] {
            let found = chi_squared_tail(x, degrees);
            assert!((found / tail - 1.0).abs() < 1e-11, "{x} {degrees} {found}");
        }
    }

    #[test]
    fn quantiles_invert_the_tails() {
        for degrees in [1.0, 2.0, 5.0, 34.0, 500.0] {
            for p in [0.001, 0.05, 0.4, 0.6, 0.95, 0.9999] {
                let back = 1.0 - 0.5 * student_tails(student_quantile(p, degrees), degrees);
                let expected = f64::max(p, 1.0 - p);
                // Bisection ends at neighbouring numbers.
                assert!((back - expected).abs() < 1e-13, "{degrees} {p} {back}");
            }
        }
        assert!(student_quantile(0.5, 3.0).abs() < 1e-300);
        assert!((student_quantile(0.95, f64::INFINITY) - normal_quantile(0.95)).abs() < 1e-15);
    }
}
