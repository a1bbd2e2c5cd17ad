//! Solid spots: the conductance of two rough faces pressed together.

mod fits;
mod mode;
mod prepared;

pub use fits::{elastic_fit, plastic_fit};
pub use mode::{Asperities, Mode};
pub(crate) use prepared::Spots;

use std::f64::consts::PI;

use crate::{conductance::Face, numerics::special::normal_quantile};

/// Share of the apparent area at which the faces have met up to their mean planes. The Gaussian
/// laws describe separate spots and end here at the latest.
pub const LARGEST_SHARE: f64 = 0.5;

/// Load over hardness taken where the indentation of a coating needs one load: the middle of the
/// range for which the laws are published.
pub(crate) const REFERENCE_LOAD: f64 = 1e-3;

/// The two faces as one rough face against a smooth one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Surfaces {
    /// Harmonic mean conductivity, W/(m K).
    pub conductivity: f64,
    /// Combined root-mean-square roughness, m.
    pub roughness: f64,
    /// Combined root-mean-square slope, 1.
    pub slope: f64,
    /// Effective modulus, Pa.
    pub elastic_modulus: f64,
}

impl Surfaces {
    /// Combines two bare faces.
    ///
    /// ```text
    /// k = 2 k₁ k₂/(k₁ + k₂),  σ = √(σ₁² + σ₂²),  m = √(m₁² + m₂²),
    /// 1/E′ = (1 − ν₁²)/E₁ + (1 − ν₂²)/E₂
    /// ```
    ///
    /// Valid: independent heights on the two faces.
    /// Source: Mechanical Engineers' Handbook, 3rd ed., vol. 4, pp. 374–375.
    /// Checked: `faces_combine` in `tests/validation_conductance.rs`.
    pub fn of(faces: &[Face; 2]) -> Self {
        let [first, second] = faces;
        let compliance = |face: &Face| (1.0 - face.poisson * face.poisson) / face.youngs_modulus;
        Self {
            conductivity: harmonic_mean([first.conductivity, second.conductivity]),
            roughness: first.roughness.hypot(second.roughness),
            slope: first.slope.hypot(second.slope),
            elastic_modulus: (compliance(first) + compliance(second)).recip(),
        }
    }

    /// Mean radius of a spot at that share of the area in contact, m.
    ///
    /// ```text
    /// a = √(8/π) (σ/m) exp(λ²/2) erfc(λ/√2),   ½ erfc(λ/√2) = share
    /// ```
    ///
    /// `σ` is the roughness of both faces in quadrature, m, `m` their slope, 1. Valid: Gaussian rough faces.
    /// Source: Cooper, Mikic & Yovanovich 1969, from memory.
    /// Checked: `spots_carry_the_area_and_the_conductance`.
    pub fn spot_radius(&self, share: f64) -> f64 {
        let separation = -normal_quantile(share);
        let ratio = (0.5 * separation * separation).exp() * 2.0 * share;
        (8.0 / PI).sqrt() * self.roughness / self.slope * ratio
    }
}

/// Harmonic mean, 2ab/(a + b).
pub fn harmonic_mean(values: [f64; 2]) -> f64 {
    2.0 / (values[0].recip() + values[1].recip())
}

/// Conductance on unloading from the highest pressure, as a multiple of that at the highest.
///
/// ```text
/// h(P) = h(P_max) (P / P_max)^½
/// ```
///
/// `pressure_ratio` is `P/P_max`. Valid: 0 to 1, the first unloading; published exponents 0.4 to 0.6, less accurate below
/// 4e5 Pa.
/// Source: working rule after Mikic 1971, from memory.
/// Checked: `unloading_stays_above_first_loading`.
pub fn unloading_factor(pressure_ratio: f64) -> f64 {
    pressure_ratio.sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    const PAIR: Surfaces = Surfaces {
        conductivity: 167.0,
        roughness: 1.2e-6,
        slope: 0.15,
        elastic_modulus: 4e10,
    };

    // The number of spots follows from two independent statements: their area, n π a² = share,
    // with the mean square of the radius equal to the square of the mean in this model; and their
    // conductance 2 k n a ψ⁻¹. Both must give the exact plastic law; 1e-12 is rounding.
    #[test]
    fn spots_carry_the_area_and_the_conductance() {
        for share in [1e-6, 1e-4, 1e-2, 0.1] {
            let radius = PAIR.spot_radius(share);
            let density = share / (PI * radius * radius);
            let constriction = (1.0 - f64::sqrt(share)).powf(1.5);
            let from_spots = 2.0 * PAIR.conductivity * density * radius / constriction;
            let plastic = Mode::plastic(1e9).reduced_conductance(share * 1e9);
            let law = PAIR.conductivity * PAIR.slope / PAIR.roughness * plastic;
            assert!((from_spots / law - 1.0).abs() < 1e-12, "{share}");
        }
    }

    #[test]
    fn unloading_stays_above_first_loading() {
        let loading = |ratio: f64| ratio.powf(0.95);
        for ratio in [0.01, 0.3, 0.99] {
            assert!(unloading_factor(ratio) > loading(ratio));
        }
        assert!((unloading_factor(1.0) - 1.0).abs() < 1e-15);
    }
}
