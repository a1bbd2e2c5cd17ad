//! A back that radiates: its film about the mean sink surface, and its balance of heat.

use crate::numerics::roots;

/// Stefan–Boltzmann constant, W/(m² K⁴). CODATA 2018, exact in the SI of 2019.
pub const STEFAN_BOLTZMANN: f64 = 5.670374419e-8;

/// Tolerance of a temperature, K: far below what is printed.
const TOLERANCE: f64 = 1e-9;

/// Film coefficient of a grey surface about a temperature, W/(m² K).
///
/// ```text
/// h = dq/dT = 4 ε σ T³
/// ```
///
/// | symbol | quantity | SI unit |
/// |---|---|---|
/// | `ε` | hemispherical emissivity | 1 |
/// | `σ` | Stefan–Boltzmann constant | W/(m² K⁴) |
/// | `T` | mean temperature of the surface | K |
///
/// Results refer to the mean sink surface, where the flux is the heat over the area whatever the
/// surroundings are. What spreads the heat is how the flux grows where the surface is warmer than
/// its mean: this slope. The chord to the surroundings, `ε σ (T² + Tₑ²)(T + Tₑ)`, is a quarter of it
/// towards deep space and would even out the flux as much too little.
///
/// Valid: grey surface that sees no part of itself; differences along the surface small against `T`
/// (second order in them over `T`).
/// Source: derivative of the Stefan–Boltzmann law.
/// Checked: `the_slope_meets_a_fin_that_radiates_by_the_fourth_power`.
pub fn radiative_film(emissivity: f64, temperature: f64) -> f64 {
    4.0 * emissivity * STEFAN_BOLTZMANN * temperature.powi(3)
}

/// A back of one temperature before surroundings of another.
///
/// ```text
/// Q = A (h (T − Tₑ) + ε σ (T⁴ − Tₑ⁴))
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RadiatingBack {
    /// Hemispherical emissivity, 1.
    pub emissivity: f64,
    /// Films on the whole back beside it, W/(m² K).
    pub film: f64,
    /// Area, m².
    pub area: f64,
}

impl RadiatingBack {
    /// Heat given off by a surface to surroundings, both K; W.
    pub fn given_off(&self, surface: f64, surroundings: f64) -> f64 {
        let radiated = STEFAN_BOLTZMANN * (surface.powi(4) - surroundings.powi(4));
        self.area * (self.film * (surface - surroundings) + self.emissivity * radiated)
    }

    /// Temperature of the surroundings that take a heat (W) from a surface, K; none where even
    /// surroundings at 0 K do not.
    ///
    /// Checked: `surface_and_surroundings_balance_the_heat`.
    pub fn surroundings(&self, surface: f64, heat: f64) -> Option<f64> {
        roots::bracketed(
            |surroundings| self.given_off(surface, surroundings) - heat,
            0.0,
            surface,
            TOLERANCE,
        )
    }

    /// Temperature of the surface that gives off a heat (W) to surroundings, K; none where no
    /// number does.
    pub fn surface(&self, surroundings: f64, heat: f64) -> Option<f64> {
        let flux = heat / (self.emissivity * STEFAN_BOLTZMANN * self.area);
        // Without the film the surface would be as hot as this; a little more for rounding.
        let hottest = (surroundings.powi(4) + flux).powf(0.25) + TOLERANCE;
        roots::bracketed(
            |surface| self.given_off(surface, surroundings) - heat,
            surroundings,
            hottest,
            TOLERANCE,
        )
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const BACK: RadiatingBack = RadiatingBack {
        emissivity: 0.8,
        film: 0.0,
        area: 0.01,
    };

    #[test]
    fn surface_and_surroundings_balance_the_heat() {
        // By hand: T⁴ = Q/(ε σ A) towards 0 K; 0.8 · 5.670374419e-8 · 0.01 · 300⁴ = 3.674402624 W.
        let surface = BACK.surface(0.0, 3.674_402_623_5).expect("a surface");
        // Ten printed digits of the product.
        assert!((surface - 300.0).abs() < 1e-7, "{surface}");
        for back in [BACK, RadiatingBack { film: 5.0, ..BACK }] {
            let surface = back.surface(260.0, 2.5).expect("a surface");
            let surroundings = back.surroundings(surface, 2.5).expect("surroundings");
            // Twice the tolerance of a root.
            assert!((surroundings - 260.0).abs() < 1e-7, "{surroundings}");
        }
        assert_eq!(BACK.surroundings(300.0, 3.7), None);
    }

    #[test]
    fn the_film_is_the_slope_of_the_heat() {
        let step = 1e-3;
        let rise = BACK.given_off(300.0 + step, 250.0) - BACK.given_off(300.0 - step, 250.0);
        let slope = rise / (2.0 * step * BACK.area);
        // A difference of numbers near 2 W over 2 mK.
        assert!((radiative_film(0.8, 300.0) / slope - 1.0).abs() < 1e-8);
    }
}
