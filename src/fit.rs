//! Own measurements to a law with its scatter, or to one unknown of the model.
//!
//! Everything is fitted in logarithms: conductance spans decades and its scatter is a factor.

pub mod block;
pub mod likelihood;
pub mod line;
pub mod outliers;
pub mod power;
pub mod profile;
pub mod readings;
pub mod series;
pub mod table;
pub mod unknown;

pub use outliers::Outlier;
pub use power::PowerLaw;
pub use readings::{Abscissa, Direction, Ordinate, Reading, Readings};
pub use series::{Branch, Hysteresis, Series, Shape};
pub use table::MonotoneTable;

/// Probability that every interval and band of a fit holds.
pub const CONFIDENCE: f64 = 0.9;

/// Chance of a false word in each test of a fit.
const SIGNIFICANCE: f64 = 0.05;

#[cfg(test)]
mod tests {
    use crate::numerics::special::normal_quantile;

    /// Standard normal numbers of a seed (splitmix64, from memory).
    pub(super) fn normals(seed: u64, count: usize) -> Vec<f64> {
        // A step unlike that of the sequence, so that seeds do not share their numbers.
        let mut state = seed.wrapping_mul(0xD134_2543_DE82_EF95);
        let mut next = || {
            state = state.wrapping_add(0x9E37_79B9_7F4A_7C15);
            let mut z = state;
            z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
            z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
            z ^ (z >> 31)
        };
        (0..count)
            .map(|_| normal_quantile(((next() >> 11) as f64 + 0.5) * 2f64.powi(-53)))
            .collect()
    }
}
