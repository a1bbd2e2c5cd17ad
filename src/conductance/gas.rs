//! Gas in the gaps between the spots, and where the faces part.

mod accommodation;
mod laws;

pub use accommodation::{Molecule, Wall, accommodation};
pub(crate) use laws::GapLaw;
pub use laws::{Gap, separation_fit, separation_ratio};

use crate::{catalog::Gas, numerics::interpolation};

/// Pressure at which the catalogue gives mean free paths, Pa.
const CATALOGUE_PRESSURE: f64 = 101_325.0;

/// Gas as the gap meets it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct GapGas {
    /// Conductivity, W/(m K).
    pub conductivity: f64,
    /// Gas parameter M: the temperature jump at both walls as a length, m.
    pub parameter: f64,
}

/// Gas at a pressure and a temperature, for any accommodation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rarefied {
    /// Conductivity, W/(m K).
    conductivity: f64,
    /// Accommodation of the catalogue, 1.
    accommodation: f64,
    /// Gas parameter over the sum of (2 − α)/α at both walls, m.
    jump: f64,
}

impl Rarefied {
    /// Gas at a pressure (Pa, above zero) and a temperature (K).
    ///
    /// Tables are interpolated between their temperatures and hold their end values outside; the
    /// caller compares the temperature with `gas.temperatures`. Vacuum is no gas at all: do not come
    /// here with zero pressure.
    pub fn of(gas: &Gas, pressure: f64, temperature: f64) -> Self {
        Self {
            conductivity: tabulated(gas, &gas.conductivity, temperature),
            accommodation: gas.accommodation.value,
            jump: jump(gas, pressure, temperature),
        }
    }

    /// The gas with the catalogue's accommodation times `factor` at both walls; it ends at 1.
    #[inline]
    pub fn with(&self, factor: f64) -> GapGas {
        let accommodation = (self.accommodation * factor).min(1.0);
        GapGas {
            conductivity: self.conductivity,
            parameter: 2.0 * (2.0 - accommodation) / accommodation * self.jump,
        }
    }
}

/// [`Rarefied::of`] with the catalogue's accommodation times `factor` at both walls.
///
/// Checked: `gas_parameter_of_air` in `validation_conductance/gap.rs`.
pub fn at(gas: &Gas, pressure: f64, temperature: f64, factor: f64) -> GapGas {
    Rarefied::of(gas, pressure, temperature).with(factor)
}

/// Gas parameter M, m: the temperature jumps at both walls as a length of gas.
///
/// ```text
/// M = ((2 − α₁)/α₁ + (2 − α₂)/α₂) · 2γ/(1 + γ) / Pr · Λ,   Λ = Λ(T, 1 atm) · 101 325 Pa / p
/// ```
///
/// | symbol | quantity | SI unit | argument |
/// |---|---|---|---|
/// | `α` | thermal accommodation at the wall | 1 | `accommodation` |
/// | `γ` | ratio of specific heats | 1 | `gas.heat_ratio` |
/// | `Pr` | Prandtl number | 1 | `gas.prandtl` |
/// | `Λ` | mean free path | m | `gas.mean_free_path` |
/// | `p` | absolute pressure, above zero | Pa | `pressure` |
/// | `T` | temperature | K | `temperature` |
///
/// Valid: from continuum to free molecules, where `k/M` is the conductance of the gap.
/// Source: Bahrami et al. 2006, Int. J. Heat Mass Transfer 49, 3691, as quoted by others.
/// Checked: `gas_parameter_of_air` in `validation_conductance/gap.rs`.
pub fn gas_parameter(gas: &Gas, pressure: f64, temperature: f64, accommodation: [f64; 2]) -> f64 {
    let walls: f64 = accommodation.iter().map(|a| (2.0 - a) / a).sum();
    walls * jump(gas, pressure, temperature)
}

/// Gas parameter over the sum of (2 − α)/α at both walls, m.
fn jump(gas: &Gas, pressure: f64, temperature: f64) -> f64 {
    let heat_ratio = tabulated(gas, &gas.heat_ratio, temperature);
    let prandtl = tabulated(gas, &gas.prandtl, temperature);
    let path = tabulated(gas, &gas.mean_free_path, temperature) * CATALOGUE_PRESSURE / pressure;
    2.0 * heat_ratio / (1.0 + heat_ratio) / prandtl * path
}

fn tabulated(gas: &Gas, column: &[f64], temperature: f64) -> f64 {
    let points: Vec<(f64, f64)> = gas
        .temperatures
        .iter()
        .copied()
        .zip(column.iter().copied())
        .collect();
    interpolation::linear(&points, temperature)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog;

    fn gas(name: &str) -> &'static Gas {
        catalog::gas(name).expect("the gas is in the catalogue")
    }

    // 2γ/(1 + γ)/Pr with γ = 5/3 and Pr = 2/3, the kinetic theory of single atoms: 1.875. The tables of helium
    // and argon at 300 K have Pr 0.664 and 0.665: 1 %. Walls that accommodate fully count 1 each.
    #[test]
    fn single_atoms_jump_as_the_kinetic_theory_says() {
        for name in ["helium", "argon"] {
            let gas = gas(name);
            let path = tabulated(gas, &gas.mean_free_path, 300.0);
            let found = gas_parameter(gas, CATALOGUE_PRESSURE, 300.0, [1.0; 2]) / (2.0 * path);
            assert!((found / 1.875 - 1.0).abs() < 0.01, "{name}: {found}");
        }
    }

    // 2γ/(1 + γ)/Pr at 300 K by CoolProp 8.0.0, computed for this project. The catalogue has γ and Pr of the same
    // source to four places, so that the form alone is held: 2e-4.
    #[test]
    fn gas_parameter_follows_heat_ratio_and_prandtl_number() {
        for (name, beta) in [("air", 1.6508), ("nitrogen", 1.6268), ("helium", 1.8837)] {
            let gas = gas(name);
            let path = tabulated(gas, &gas.mean_free_path, 300.0);
            // A wall that takes half of what it is offered counts 3, one that takes all 1.
            let found = gas_parameter(gas, CATALOGUE_PRESSURE, 300.0, [1.0, 0.5]) / (4.0 * path);
            assert!((found / beta - 1.0).abs() < 2e-4, "{name}: {found}");
        }
    }

    // The same product in another order: rounding.
    #[test]
    fn thinner_gas_jumps_more_and_accommodation_ends_at_one() {
        let air = gas("air");
        let at_one_atmosphere = at(air, CATALOGUE_PRESSURE, 300.0, 1.0);
        let thin = at(air, CATALOGUE_PRESSURE / 100.0, 300.0, 1.0);
        assert!((thin.parameter / at_one_atmosphere.parameter - 100.0).abs() < 1e-10);
        assert!((thin.conductivity - at_one_atmosphere.conductivity).abs() < f64::EPSILON);
        let full = at(air, CATALOGUE_PRESSURE, 300.0, 9.0);
        let exact = gas_parameter(air, CATALOGUE_PRESSURE, 300.0, [1.0; 2]);
        assert!((full.parameter / exact - 1.0).abs() < 1e-14);
    }
}
