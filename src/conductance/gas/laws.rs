//! Separation of the mean planes, and the conductance of the gas between them.

use std::f64::consts::PI;

use crate::{
    conductance::GapGas,
    numerics::{
        quadrature::{Integral, adaptive},
        special::normal_quantile,
    },
};

/// Load over hardness below which the gap no longer opens: 4.75 σ, where the tallest peaks of a
/// real surface stand (an assumption: the Gaussian has no tallest peak).
const LIGHTEST_LOAD: f64 = 1e-6;

/// Load over hardness above which the gap no longer closes: with a third of the area touching,
/// the distance of the mean planes is no measure of what is left between them.
const HEAVIEST_LOAD: f64 = 0.3;

/// A gap between rough faces.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Gap {
    /// Separation of the mean planes Y, m.
    pub separation: f64,
    /// Combined root-mean-square roughness σ, m.
    pub roughness: f64,
}

/// Separation of the mean planes over σ, 1.
///
/// ```text
/// Y/σ = √2 erfc⁻¹(2P/H)
/// ```
///
/// `load` is P/H, H the contact hardness of the softer face. Held below 1e-6 (4.75 σ: the tallest
/// peaks) and above 0.3, so that faces which just part keep the gap of their peaks.
/// Valid: Gaussian rough faces.
/// Source: area of overlap of a Gaussian surface, exact.
/// Checked: `separation_fit_agrees_with_the_exact_form` in `validation_conductance/gap.rs`,
/// `separation_is_held_at_its_ends`.
#[inline]
pub fn separation_ratio(load: f64) -> f64 {
    -normal_quantile(load.clamp(LIGHTEST_LOAD, HEAVIEST_LOAD))
}

/// Separation of the mean planes over σ, as published.
///
/// ```text
/// Y/σ = 1.185 (−ln(3.132 P/H))^0.547
/// ```
///
/// `load` is P/H. Valid: 1e-6 to 0.02, within 0.75 % of [`separation_ratio`].
/// Source: Mechanical Engineers' Handbook, 3rd ed., vol. 4, p. 375.
/// Checked: `separation_fit_agrees_with_the_exact_form` in `validation_conductance/gap.rs`.
pub fn separation_fit(load: f64) -> f64 {
    1.185 * (-(3.132 * load).ln()).powf(0.547)
}

impl Gap {
    /// Conductance of the gas as the integral over the heights of the gap, W/(m² K).
    ///
    /// ```text
    /// h = k/(σ √(2π)) ∫₀^∞ exp(−(Y/σ − u)²/2) / (u + M/σ) du
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `k` | conductivity of the gas | W/(m K) | `gas.conductivity` |
    /// | `M` | gas parameter, above zero | m | `gas.parameter` |
    /// | `Y` | separation of the mean planes | m | `separation` |
    /// | `σ` | combined roughness | m | `roughness` |
    ///
    /// Valid: Gaussian faces, M > 0 (without a jump at the walls it diverges).
    /// Source: Yovanovich, `DeVaal` & Hegazy 1982, from memory.
    /// Checked: `gas_between_the_aluminium_pair` in `validation_conductance/gap.rs`.
    pub fn integral(&self, gas: &GapGas) -> Integral {
        let centre = self.separation / self.roughness;
        let jump = gas.parameter / self.roughness;
        // With v = ln(u + M/σ) the pole at u = −M/σ is gone; ten deviations end the Gaussian.
        let breaks = [
            jump.ln(),
            (0.1 * centre.max(0.1) + jump).ln(),
            (centre.max(0.2) + jump).ln(),
            (centre.max(0.2) + 10.0 + jump).ln(),
        ];
        let scale = gas.conductivity / (self.roughness * (2.0 * PI).sqrt());
        let shape = |v: f64| (-0.5 * (centre - v.exp() + jump).powi(2)).exp();
        let Integral { value, error } = adaptive(shape, &breaks, 1e-9);
        Integral {
            value: scale * value,
            error: scale * error,
        }
    }

    /// Conductance of the gas as if the gap were even, W/(m² K).
    ///
    /// ```text
    /// h = k/(Y + M)
    /// ```
    ///
    /// `k` is the conductivity of the gas, `Y` the separation of the mean planes and `M` the gas parameter, m.
    /// Valid: a mean gap without regard to its spread. Always below [`Gap::integral`], by up to 32 % where a thin jump meets a heavy load.
    /// Source: Mechanical Engineers' Handbook, 3rd ed., vol. 4, p. 375.
    /// Checked: `corrected_gas_law_agrees_with_the_integral` in `validation_conductance/gap.rs`.
    pub fn simple(&self, gas: &GapGas) -> f64 {
        gas.conductivity / (self.separation + gas.parameter)
    }

    /// Conductance of the gas, W/(m² K): the even gap with the correction for its heights.
    ///
    /// Checked: `corrected_gas_law_agrees_with_the_integral` in `validation_conductance/gap.rs`.
    pub fn corrected(&self, gas: &GapGas) -> f64 {
        GapLaw::new(gas, self.roughness).conductance(self.separation)
    }
}

/// The corrected law for one gas between two faces.
///
/// ```text
/// h = f k/(Y + M)
/// f = 1.063 + 0.0471 (4 − Y/σ)^1.68 (ln(σ/M))^0.84    M/σ ≤ 1
/// f = 1 + 0.06 (σ/M)^0.8                              M/σ > 1
/// f = 1 + (f₄ − 1) (2z − z²), z = ((4 σ + M)/(Y + M))³  Y/σ > 4, f₄ the value at 4
/// ```
///
/// Valid: M/σ from 0.01 (below, the value there), any Y; within 2.6 % of the integral down to Y/σ of 2,
/// and 2.2 % from 4 up. Falls with Y, so that load never lowers it.
/// Source: Yovanovich, `DeVaal` & Hegazy 1982, correction from memory, published for Y/σ below 4. Beyond,
/// the excess fades without a corner, fitted here to the integral.
/// Checked: `corrected_gas_law_agrees_with_the_integral`, `a_wide_gap_conducts_as_the_integral_says`.
#[derive(Clone, Copy, Debug)]
pub(crate) struct GapLaw {
    conductivity: f64,
    parameter: f64,
    roughness: f64,
    base: f64,
    heights: f64,
}

impl GapLaw {
    pub(crate) fn new(gas: &GapGas, roughness: f64) -> Self {
        let jump = gas.parameter / roughness;
        let (base, heights) = if jump > 1.0 {
            (1.0 + 0.06 * jump.powf(-0.8), 0.0)
        } else {
            (1.063, 0.0471 * (-jump.max(0.01).ln()).powf(0.84))
        };
        Self {
            conductivity: gas.conductivity,
            parameter: gas.parameter,
            roughness,
            base,
            heights,
        }
    }

    /// A liquid wets the walls, without jump: h = k/Y.
    pub(crate) fn of_liquid(conductivity: f64, roughness: f64) -> Self {
        Self {
            conductivity,
            parameter: 0.0,
            roughness,
            base: 1.0,
            heights: 0.0,
        }
    }

    /// Conductance at a separation of the mean planes, W/(m² K).
    #[inline]
    pub(crate) fn conductance(&self, separation: f64) -> f64 {
        let room = 4.0 - separation / self.roughness;
        let across = separation + self.parameter;
        let correction = if room <= 0.0 {
            let nearer = (4.0 * self.roughness + self.parameter) / across;
            let near = nearer * nearer * nearer;
            1.0 + (self.base - 1.0) * near * (2.0 - near)
        } else if self.heights > 0.0 {
            self.base + self.heights * room.powf(1.68)
        } else {
            self.base
        };
        correction * self.conductivity / across
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    // 4.7534 and 0.5244 are the normal quantiles of 1e-6 and 0.3.
    #[test]
    fn separation_is_held_at_its_ends() {
        assert!((separation_ratio(0.0) - 4.7534).abs() < 1e-4);
        assert!((separation_ratio(1e-7) - 4.7534).abs() < 1e-4);
        assert!((separation_ratio(0.3) - 0.5244).abs() < 1e-4);
        assert!((separation_ratio(2.0) - 0.5244).abs() < 1e-4);
        assert!(separation_ratio(f64::NAN).is_nan());
    }

    // By an independent program; 1e-9 is its printing.
    #[test]
    fn correction_matches_an_independent_program() {
        for (load, jump, wanted) in [
            (1e-3, 0.1, 9323.155524410586),
            (1e-2, 0.02, 15678.366366642771),
            (1e-4, 0.5, 6576.100676033456),
            (1e-3, 2.0, 5283.842288358419),
        ] {
            let gas = GapGas {
                conductivity: 0.026,
                parameter: jump * 1e-6,
            };
            let gap = Gap {
                separation: separation_ratio(load) * 1e-6,
                roughness: 1e-6,
            };
            assert!((gap.corrected(&gas) / wanted - 1.0).abs() < 1e-9, "{load}");
        }
    }

    // 0.5 %: the two branches of the published correction meet with 1.063 against 1.060.
    #[test]
    fn correction_branches_meet() {
        let at = |jump: f64| {
            let gas = GapGas {
                conductivity: 0.026,
                parameter: jump * 1e-6,
            };
            GapLaw::new(&gas, 1e-6).conductance(3e-6)
        };
        assert!((at(0.999_999) / at(1.000_001) - 1.0).abs() < 5e-3);
    }

    proptest::proptest! {
        #![proptest_config(crate::fixed_cases(256))]

        #[test]
        fn closing_the_gap_raises_the_conductance(
            y in 0.3..6.0f64,
            closer in 0.5..0.999f64,
            jump in -3.0..2.0f64,
        ) {
            let gas = GapGas { conductivity: 0.026, parameter: 10f64.powf(jump) * 1e-6 };
            let law = GapLaw::new(&gas, 1e-6);
            proptest::prop_assert!(law.conductance(y * closer * 1e-6) > law.conductance(y * 1e-6));
        }
    }

    /// Air at 300 K in a gap of 1 µm roughness under a load of 1e-3, at a pressure in Pa.
    fn air_between_rough_faces(pressure: f64) -> (Gap, GapGas) {
        let gap = Gap {
            separation: separation_ratio(1e-3) * 1e-6,
            roughness: 1e-6,
        };
        // Λ 67.29 nm, 2γ/(1 + γ)/Pr 1.6508 and 0.841 of accommodation at both walls.
        let walls = 2.0 * (2.0 - 0.841) / 0.841;
        let gas = GapGas {
            conductivity: 0.026_38,
            parameter: walls * 1.6508 * 67.29e-9 * 101_325.0 / pressure,
        };
        (gap, gas)
    }

    // Computed for this project by an independent program, from the atmosphere to free molecules: half of the
    // last printed digit, and 0.1 % for the accommodation that is told to three digits.
    #[test]
    fn thinning_air_conducts_ever_less() {
        for (pressure, printed, digit) in [
            (101_325.0, 8705.0, 1.0),
            (1e4, 4370.0, 10.0),
            (1e3, 773.0, 1.0),
            (100.0, 84.1, 0.1),
            (10.0, 8.48, 0.01),
            (1.0, 0.849, 1e-3),
            (1e-3, 8.5e-4, 1e-5),
        ] {
            let (gap, gas) = air_between_rough_faces(pressure);
            let found = gap.integral(&gas).value;
            let allowed = 0.5 * digit + 1e-3 * printed;
            assert!((found - printed).abs() < allowed, "{pressure}: {found}");
        }
    }

    // In the plain variable u, without the logarithm: the midpoint rule on 200 000 steps is good to 1e-6
    // where M/σ is a hundred steps or more.
    #[test]
    fn integral_over_the_heights_is_that_of_the_plain_sum() {
        for (centre, jump) in [(3.0, 0.1), (2.0, 1.0), (3.0, 2.9), (0.6, 2.0), (3.0, 40.0)] {
            let gas = GapGas {
                conductivity: 0.026,
                parameter: jump * 0.7e-6,
            };
            let gap = Gap {
                separation: centre * 0.7e-6,
                roughness: 0.7e-6,
            };
            let steps = 200_000;
            let du = (centre + 10.0) / f64::from(steps);
            let sum: f64 = (0..steps)
                .map(|step| (f64::from(step) + 0.5) * du)
                .map(|u| (-0.5 * (centre - u).powi(2)).exp() / (u + jump) * du)
                .sum();
            let wanted = 0.026 / (0.7e-6 * (2.0 * PI).sqrt()) * sum;
            let found = gap.integral(&gas).value;
            assert!(
                (found / wanted - 1.0).abs() < 1e-6,
                "{centre} {jump}: {found} {wanted}"
            );
        }
    }

    // 1/h = Y/k + M/k: rounding alone.
    #[test]
    fn an_even_gap_and_the_jumps_at_its_walls_are_in_series() {
        let gap = Gap {
            separation: 3e-6,
            roughness: 1e-6,
        };
        let gas = GapGas {
            conductivity: 0.026,
            parameter: 0.4e-6,
        };
        let resistance = 3e-6 / 0.026 + 0.4e-6 / 0.026;
        assert!((gap.simple(&gas) * resistance - 1.0).abs() < 1e-12);
        // Heights that spread about their mean conduct more than the mean.
        assert!(gap.simple(&gas) < gap.integral(&gas).value);
    }
}
