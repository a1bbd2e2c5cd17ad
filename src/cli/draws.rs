//! The options that say how many joints are drawn, and from which seed.

use clap::Args;

use crate::estimate::Options;

/// Draws unless told otherwise.
const DRAWS: u32 = 1024;
/// Seed unless told otherwise.
const SEED: u64 = 1;

/// How the low and the high are found.
#[derive(Clone, Copy, Debug, Args)]
pub struct Draws {
    /// Joints drawn for low and high, up to 1e7; 0 gives the nominal alone
    #[arg(long, value_name = "N", default_value_t = DRAWS, value_parser = draws)]
    pub draws: u32,
    /// Seed of the draws
    #[arg(long, value_name = "N", default_value_t = SEED)]
    pub seed: u64,
}

impl Default for Draws {
    fn default() -> Self {
        Self {
            draws: DRAWS,
            seed: SEED,
        }
    }
}

impl Draws {
    /// The same for the chain.
    pub fn options(self) -> Options {
        Options {
            draws: self.draws,
            seed: self.seed,
        }
    }
}

/// Draws below this cannot tell a 5 % quantile.
const FEWEST: u32 = 20;
/// Draws above this tell nothing new: the sampling error is then far below every other.
const MOST: u32 = 10_000_000;

/// A number of draws: none, or enough for the quantiles.
fn draws(text: &str) -> Result<u32, String> {
    match number(text) {
        Some(count) if count == 0 || (FEWEST..=MOST).contains(&count) => Ok(count),
        _ => Err(format!(
            "draws are 0 (nominal alone) or from {FEWEST} to {MOST}, such as 1024 or 1e6; below {FEWEST} there is no 5 % quantile"
        )),
    }
}

/// A whole number, plain or as a power of ten: `16384`, `1e6`, `2.5e5`.
pub fn number(text: &str) -> Option<u32> {
    if let Ok(whole) = text.parse() {
        return Some(whole);
    }
    let written = text
        .bytes()
        .all(|byte| byte.is_ascii_digit() || b".eE+".contains(&byte));
    let value: f64 = text.parse().ok().filter(|_| written)?;
    let whole = value.fract() == 0.0 && value <= f64::from(u32::MAX);
    whole.then_some(value as u32)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_are_whole_plain_or_with_a_power_of_ten() {
        assert_eq!(number("1024"), Some(1024));
        assert_eq!(number("1e6"), Some(1_000_000));
        assert_eq!(number("2.5E+5"), Some(250_000));
        for wrong in ["", "-1", "1.5", "1e-3", "nan", "inf", "1e99", "ten", "0x10"] {
            assert_eq!(number(wrong), None, "{wrong}");
        }
        assert_eq!(draws("0"), Ok(0));
        assert_eq!(draws("1e7"), Ok(10_000_000));
        assert!(draws("19").is_err() && draws("1e8").is_err());
    }
}
