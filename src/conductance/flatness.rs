//! Faces that are not flat, pressed by a mean load without bolts.
//!
//! Bolted joints do not come here: there the bow is the initial gap of the contact solution, and
//! this term on top of it would count the same resistance twice.

use std::f64::consts::PI;

/// A pair of crowned faces under a mean load.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Crowned {
    /// Mean pressure on the whole face, Pa.
    pub pressure: f64,
    /// Young's moduli of the two bodies, Pa.
    pub youngs_moduli: [f64; 2],
    /// Radius of the face, m.
    pub radius: f64,
    /// Total out-of-flatness of both faces, m.
    pub flatness: f64,
}

impl Crowned {
    /// Radius of the contact over the radius of the face, 1.
    ///
    /// ```text
    /// x = 1.285 ((P/E) (b/d))^(1/3),   E = 2 E₁ E₂/(E₁ + E₂)
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `P` | mean pressure | Pa | `pressure` |
    /// | `E` | Young's modulus | Pa | `youngs_moduli` |
    /// | `b` | radius of the face | m | `radius` |
    /// | `d` | total out-of-flatness | m | `flatness` |
    ///
    /// Valid: x < 0.65, faces pressed without bolts.
    /// Source: Clausing & Chao 1963, from memory; the constant is Hertz's for ν = 0.30 within 0.4 %.
    /// Checked: `crowned_faces` in `tests/validation_conductance.rs`.
    pub fn contact_ratio(&self) -> f64 {
        let [first, second] = self.youngs_moduli;
        let modulus = 2.0 / (first.recip() + second.recip());
        1.285 * (self.pressure / modulus * self.radius / self.flatness).cbrt()
    }

    /// Conductance of the convergence towards the contact, on the whole face, W/(m² K).
    ///
    /// ```text
    /// h = 2 k x/(π b g(x))
    /// ```
    ///
    /// `conductivity` is the harmonic mean of both bodies, W/(m K). The spots act in series with
    /// it, on the share x² of the face and at the pressure P/x².
    /// Valid, source, checked: as [`Crowned::contact_ratio`].
    pub fn conductance(&self, conductivity: f64) -> f64 {
        let ratio = self.contact_ratio();
        2.0 * conductivity * ratio / (PI * self.radius * constriction(ratio))
    }
}

/// Constriction of heat in a cylinder towards a spot of relative radius x, 1.
///
/// ```text
/// g = 1 − 1.40925x + 0.29591x³ + 0.05254x⁵ + 0.02105x⁷ + 0.01107x⁹
/// ```
///
/// Valid: 0 ≤ x ≤ 0.65. Source: Roess 1950, from memory; within 0.8 % of (1 − x)^1.5 up to 0.3.
/// Checked: `crowned_faces` in `tests/validation_conductance.rs`.
pub fn constriction(x: f64) -> f64 {
    let square = x * x;
    let odd =
        -1.40925 + square * (0.29591 + square * (0.05254 + square * (0.02105 + square * 0.01107)));
    1.0 + x * odd
}

#[cfg(test)]
mod tests {
    use super::*;

    // Both halves of the body around a lone spot of radius a on its wide face: R = 1/(2 k a), exact. The spot
    // fills x of the radius, and the walls of the cylinder matter to first order in x: 1.41 x, rounded up.
    #[test]
    fn a_small_contact_conducts_as_a_spot_on_a_half_space() {
        let crowned = Crowned {
            pressure: 1e2,
            youngs_moduli: [70e9, 200e9],
            radius: 0.020,
            flatness: 50e-6,
        };
        let x = crowned.contact_ratio();
        assert!((1e-3..2e-2).contains(&x), "{x}");
        let spot = 2.0 * 167.0 * x * crowned.radius;
        let face = PI * crowned.radius * crowned.radius;
        let found = crowned.conductance(167.0) * face / spot;
        assert!(found > 1.0 && found < 1.0 + 1.5 * x, "{found} {x}");
    }

    // 0.8 % up to 0.3: what the docstring states of (1 − x)^1.5, the factor that the spots take.
    #[test]
    fn constriction_fades_as_the_contact_fills_the_face() {
        assert!((constriction(0.0) - 1.0).abs() < f64::EPSILON);
        for step in 1..=30 {
            let x = f64::from(step) / 100.0;
            let ratio = constriction(x) / (1.0 - x).powf(1.5);
            assert!((ratio - 1.0).abs() < 8e-3, "{x}: {ratio}");
        }
        for step in 1..=65 {
            let x = f64::from(step) / 100.0;
            assert!(constriction(x) < constriction(x - 0.01) && constriction(x) > 0.0);
        }
    }
}
