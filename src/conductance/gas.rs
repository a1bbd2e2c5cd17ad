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
