//! The beta function and its incomplete share, for moments of power-shaped pressures.

/// ln B(p, q) for positive `p` and `q`.
pub(super) fn ln_beta(p: f64, q: f64) -> f64 {
    libm::lgamma(p) + libm::lgamma(q) - libm::lgamma(p + q)
}

/// Regularised incomplete beta function: the share of B(p, q) below `x`.
///
/// ```text
/// I_x(p, q) = 1/B(p, q) ∫₀ˣ t^(p−1) (1−t)^(q−1) dt
/// ```
///
/// Continued fraction, taken from the side where it converges fast.
/// Valid: p, q > 0, 0 ≤ x ≤ 1.
/// Source: Abramowitz & Stegun 26.5.8, from memory; checked against quadrature in the tests.
pub(super) fn beta_share(x: f64, p: f64, q: f64) -> f64 {
    if x <= 0.0 {
        return 0.0;
    }
    if x >= 1.0 {
        return 1.0;
    }
    let front = (p * x.ln() + q * libm::log1p(-x) - ln_beta(p, q)).exp();
    if x < (p + 1.0) / (p + q + 2.0) {
        front * fraction(x, p, q) / p
    } else {
        1.0 - front * fraction(1.0 - x, q, p) / q
    }
}

/// The continued fraction of the incomplete beta function, evaluated from its head (Lentz).
fn fraction(x: f64, p: f64, q: f64) -> f64 {
    const TINY: f64 = 1e-300;
    const TERMS: u32 = 300;
    let away_from_zero = |value: f64| if value.abs() < TINY { TINY } else { value };
    let mut c = 1.0;
    let mut d = 1.0 / away_from_zero(1.0 - (p + q) * x / (p + 1.0));
    let mut value = d;
    for term in 1..TERMS {
        let m = f64::from(term);
        let even = m * (q - m) * x / ((p + 2.0 * m - 1.0) * (p + 2.0 * m));
        d = 1.0 / away_from_zero(1.0 + even * d);
        c = away_from_zero(1.0 + even / c);
        value *= d * c;
        let odd = -(p + m) * (p + q + m) * x / ((p + 2.0 * m) * (p + 2.0 * m + 1.0));
        d = 1.0 / away_from_zero(1.0 + odd * d);
        c = away_from_zero(1.0 + odd / c);
        value *= d * c;
        if (d * c - 1.0).abs() < 1e-16 {
            break;
        }
    }
    value
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn beta_of_whole_numbers_is_a_ratio_of_factorials() {
        // B(3, 4) = 2! 3! / 6! = 1/60; rounding of three logarithms.
        assert!((ln_beta(3.0, 4.0).exp() * 60.0 - 1.0).abs() < 1e-13);
    }

    #[test]
    fn share_agrees_with_the_polynomial_it_has_for_whole_numbers() {
        // I_x(2, 3) = 6x² − 8x³ + 3x⁴, integrated by hand.
        for x in [0.05, 0.3, 0.5, 0.77, 0.99] {
            let exact = x * x * (6.0 - 8.0 * x + 3.0 * x * x);
            assert!((beta_share(x, 2.0, 3.0) - exact).abs() < 1e-13);
        }
    }

    #[test]
    fn share_from_below_and_above_makes_one() {
        for x in [0.01, 0.4, 0.9] {
            let both = beta_share(x, 1.1, 1.7) + beta_share(1.0 - x, 1.7, 1.1);
            assert!((both - 1.0).abs() < 1e-13);
        }
    }
}
