//! Radiation across the gap.

use crate::joint::STEFAN_BOLTZMANN;

/// Conductance by radiation between two parallel faces, W/(m² K).
///
/// ```text
/// h_r = 4 s T³ / (1/ε₁ + 1/ε₂ − 1)
/// ```
///
/// | symbol | quantity | SI unit | argument |
/// |---|---|---|---|
/// | `T` | mean temperature | K | `temperature` |
/// | `ε` | hemispherical emissivity | 1 | `emissivity` |
/// | `s` | Stefan–Boltzmann constant | W/(m² K⁴) | |
///
/// Valid: grey, diffuse faces, gap small against its extent, drop small against `T`. A face that
/// does not emit gives zero.
/// Source: standard result for parallel plates; Stefan–Boltzmann constant of CODATA 2018.
/// Checked: `radiation_between_black_faces`, and in `tests/validation_conductance.rs`.
pub fn conductance(temperature: f64, emissivity: [f64; 2]) -> f64 {
    let [first, second] = emissivity;
    4.0 * STEFAN_BOLTZMANN * temperature.powi(3) / (first.recip() + second.recip() - 1.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    // Half a unit of the last digit printed: 6.124, 4.08, 0.32, 0.157 W/(m² K) at 300 K.
    #[test]
    fn radiation_between_black_faces() {
        for (emissivity, wanted, half_digit) in [
            (1.0, 6.124, 5e-4),
            (0.8, 4.08, 5e-3),
            (0.1, 0.32, 5e-3),
            (0.05, 0.157, 5e-4),
            (0.0, 0.0, 1e-300),
        ] {
            let found = conductance(300.0, [emissivity; 2]);
            assert!((found - wanted).abs() < half_digit, "{emissivity}: {found}");
        }
    }
}
