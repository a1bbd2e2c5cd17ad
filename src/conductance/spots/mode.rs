//! The exact Gaussian laws: plastic, elastic, and continuous between the two.

use std::f64::consts::{PI, SQRT_2};

use crate::{conductance::spots::LARGEST_SHARE, joint::Law, numerics::special::normal_quantile};

/// Hardness over the flow stress of the surface layer.
const HARDNESS_OVER_FLOW_STRESS: f64 = 2.76;

/// What the laws need of the asperities.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Asperities {
    /// Combined root-mean-square slope, 1.
    pub slope: f64,
    /// Effective modulus E′, Pa.
    pub elastic_modulus: f64,
    /// Contact hardness of the softer face, Pa.
    pub hardness: f64,
}

/// How the asperities give way: a hardness, and the area they need for a load.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Mode {
    /// Load over this is the share the spots would cover if they were plastic, Pa.
    pub hardness: f64,
    /// The share of the geometric overlap that really touches: 1 plastic, ½ elastic.
    pub area_factor: f64,
    /// Contact strain ε*: elastic below about 5, plastic above about 400; 1. Zero and infinite
    /// for the pure laws.
    pub strain: f64,
}

impl Asperities {
    /// Hardness of the elastic law, Pa.
    ///
    /// ```text
    /// H_e = m E′ / √2
    /// ```
    ///
    /// `m` is the slope of the asperities, 1, and `E′` the modulus of both faces, Pa. Valid: asperities that stay elastic.
    /// Source: Mikic 1974, from memory; that the group is P/(E′ m) is seen.
    pub fn elastic_hardness(&self) -> f64 {
        self.slope * self.elastic_modulus / SQRT_2
    }

    /// The mode by which these asperities give way under a law.
    pub fn mode(&self, law: Law) -> Mode {
        match law {
            Law::Plastic | Law::PlasticPower => Mode::plastic(self.hardness),
            Law::Elastic => Mode::elastic(self.elastic_hardness()),
            Law::ElasticPlastic => Mode::elastic_plastic(self),
        }
    }
}

impl Mode {
    /// Plastic spots: the load is the hardness times the area of overlap.
    pub fn plastic(hardness: f64) -> Self {
        Self {
            hardness,
            area_factor: 1.0,
            strain: f64::INFINITY,
        }
    }

    /// Elastic spots: half of the overlap touches.
    pub fn elastic(elastic_hardness: f64) -> Self {
        Self {
            hardness: elastic_hardness,
            area_factor: 0.5,
            strain: 0.0,
        }
    }

    /// Spots continuous from elastic to plastic.
    ///
    /// ```text
    /// ε* = 1.67 E′ m / S_f,   S_f = H_c / 2.76
    /// H_ep = H_c / √(1 + (6.5/ε*)²)
    /// f = √(1 + (6.5/ε*)²) / (1 + (13/ε*)^1.2)^(1/1.2)
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `E′` | effective modulus | Pa | `elastic_modulus` |
    /// | `m` | combined slope | 1 | `slope` |
    /// | `H_c` | contact hardness, of the surface layer | Pa | `hardness` |
    /// | `S_f` | flow stress of the surface layer, not the yield strength of the bulk | Pa | |
    ///
    /// Valid: any strain; tends to the elastic and the plastic law at its ends.
    /// Source: Sridhar & Yovanovich 1996, constants from memory; both limits agree numerically
    /// with the pure laws.
    /// Checked: `elastic_plastic_law_tends_to_the_pure_laws`, and against its fit in
    /// `tests/validation_conductance.rs`.
    pub fn elastic_plastic(asperities: &Asperities) -> Self {
        let flow_stress = asperities.hardness / HARDNESS_OVER_FLOW_STRESS;
        let strain = 1.67 * asperities.elastic_modulus * asperities.slope / flow_stress;
        let elastic_part = 6.5f64.hypot(strain) / strain;
        Self {
            hardness: asperities.hardness / elastic_part,
            area_factor: elastic_part / (1.0 + (13.0 / strain).powf(1.2)).powf(1.2f64.recip()),
            strain,
        }
    }

    /// Dimensionless conductance `h σ / (k m)` by the exact Gaussian integral.
    ///
    /// ```text
    /// A = P/(f H),   λ = √2 erfc⁻¹(2A)
    /// h σ/(k m) = √f exp(−λ²/2) / (2 √(2π)) / (1 − √(f A))^1.5
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `P` | contact pressure | Pa | `pressure` |
    /// | `H` | hardness of the mode | Pa | `hardness` |
    /// | `f` | share of the overlap that touches | 1 | `area_factor` |
    /// | `λ` | separation of the mean planes over σ | 1 | |
    ///
    /// Valid: separate spots on Gaussian faces. At `A = ½` the mean planes meet; above, the value
    /// there is held and `conductance/beyond-hardness` said. No pressure, no conductance.
    /// Source: Cooper, Mikic & Yovanovich 1969, Mikic 1974, Sridhar & Yovanovich 1996, from memory;
    /// the published fits agree within 2 to 4 %.
    /// Checked: `exact_laws_agree_with_their_fits` in `tests/validation_conductance.rs`,
    /// `spots_carry_the_area_and_the_conductance`.
    #[inline]
    pub fn reduced_conductance(&self, pressure: f64) -> f64 {
        let share = pressure / (self.area_factor * self.hardness);
        self.area_factor.sqrt() * carried(share, self.area_factor * share)
    }

    /// Separation of the mean planes over σ, 1.
    pub fn separation(&self, pressure: f64) -> f64 {
        let share = pressure / (self.area_factor * self.hardness);
        -normal_quantile(held(share, LARGEST_SHARE))
    }
}

/// Conductance of an overlap, `√f` apart; `touching` is `f` times the overlap.
#[inline]
pub(super) fn carried(overlap: f64, touching: f64) -> f64 {
    if overlap <= 0.0 {
        return 0.0;
    }
    let (overlap, touching) = if overlap > LARGEST_SHARE {
        (LARGEST_SHARE, touching * LARGEST_SHARE / overlap)
    } else {
        (overlap, touching)
    };
    let separation = normal_quantile(overlap);
    let open = 1.0 - touching.sqrt();
    (-0.5 * separation * separation).exp() / (2.0 * (2.0 * PI).sqrt() * open * open.sqrt())
}

/// The value, or the cap above it; unlike `f64::min` it lets `NaN` through.
#[inline]
fn held(value: f64, cap: f64) -> f64 {
    if value > cap { cap } else { value }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn asperities(hardness: f64) -> Asperities {
        Asperities {
            slope: 0.17,
            elastic_modulus: 4e10,
            hardness,
        }
    }

    // 3e-3 in f and in H: what the form itself leaves at strains of 10⁵ and 10⁻²; the elastic
    // hardness is 6.5/1.67/... = 0.709 E′m against 1/√2, a difference of the published rounding.
    #[test]
    fn elastic_plastic_law_tends_to_the_pure_laws() {
        let soft = asperities(1e5);
        let mode = Mode::elastic_plastic(&soft);
        assert!((mode.area_factor - 1.0).abs() < 3e-3, "{mode:?}");
        assert!(
            (mode.hardness / soft.hardness - 1.0).abs() < 3e-3,
            "{mode:?}"
        );
        let hard = asperities(1e14);
        let mode = Mode::elastic_plastic(&hard);
        assert!((mode.area_factor - 0.5).abs() < 3e-3, "{mode:?}");
        assert!(
            (mode.hardness / hard.elastic_hardness() - 1.0).abs() < 3e-3,
            "{mode:?}"
        );
    }

    #[test]
    fn beyond_hardness_the_value_is_held() {
        for law in [Law::Plastic, Law::Elastic, Law::ElasticPlastic] {
            let mode = asperities(1e9).mode(law);
            let end = mode.area_factor * mode.hardness * LARGEST_SHARE;
            let at_the_end = mode.reduced_conductance(end);
            assert!(at_the_end.is_finite() && mode.separation(end).abs() < 1e-12);
            for factor in [1.0 + 1e-9, 2.0, 1e9] {
                let held = mode.reduced_conductance(end * factor);
                assert!((held / at_the_end - 1.0).abs() < 1e-14, "{law:?} {factor}");
                assert!(mode.separation(end * factor).abs() < 1e-12);
            }
        }
        assert!(Mode::plastic(1e9).reduced_conductance(f64::NAN).is_nan());
        assert!(Mode::plastic(1e9).reduced_conductance(0.0).abs() < 1e-300);
    }
}
