//! Distributions about a nominal value that is their median, within finite ends.

use crate::numerics::special::normal_quantile;

/// Where a normal distribution ends, in standard deviations; 0.27 % of its weight lies beyond.
pub const CUT: f64 = 3.0;
/// Weight of a normal distribution between its median and [`CUT`]: Φ(3) − ½.
const HALF: f64 = 0.498_650_101_968_369_9;

/// How the weight lies between a nominal value and the ends on both sides of it.
///
/// Half of the weight lies on each side, whatever the distance of the ends: the nominal value is
/// the median of every distribution, and the ends hold all of it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Shape {
    /// The same weight everywhere on one side.
    #[default]
    Uniform,
    /// Weight that falls straight to nothing at the ends.
    Triangular,
    /// Normal on each side, its ends at three standard deviations.
    Normal,
    /// The logarithm is normal, its ends at three standard deviations.
    LogNormal,
}

impl Shape {
    /// The value at a place of the weight: −1 is the low end, 0 nominal, +1 the high end; the
    /// quantile is `(1 + place)/2`.
    ///
    /// ```text
    /// x = x₀ ± s (x_end − x₀),   p = |place|
    /// s = p                          uniform
    /// s = 1 − √(1 − p)               triangular
    /// s = Φ⁻¹(½ + p (Φ(3) − ½))/3    normal; lognormal: x = x₀ (x_end/x₀)^s
    /// ```
    ///
    /// Valid: `low ≤ nominal ≤ high`, of the lognormal all above zero.
    /// Source: inverses of the distribution functions, textbook form.
    /// Checked: `quantiles_are_those_of_scipy`, `every_shape_rises_within_its_ends`.
    pub fn at(self, [low, nominal, high]: [f64; 3], place: f64) -> f64 {
        let end = if place < 0.0 { low } else { high };
        let weight = place.abs();
        let share = match self {
            // Kept in this form, so that a range gives the same digits on both sides.
            Self::Uniform => weight,
            Self::Triangular => weight / (1.0 + (1.0 - weight).sqrt()),
            Self::Normal | Self::LogNormal => {
                (normal_quantile(0.5 + HALF * weight) / CUT).clamp(0.0, 1.0)
            }
        };
        match self {
            Self::LogNormal => nominal * (end / nominal).powf(share),
            _ => nominal + share * (end - nominal),
        }
    }
}

/// Standard deviations from the median at a place from −1 to +1, without ends.
pub fn deviations(place: f64) -> f64 {
    normal_quantile(0.5 * (1.0 + place))
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    const SHAPES: [Shape; 4] = [
        Shape::Uniform,
        Shape::Triangular,
        Shape::Normal,
        Shape::LogNormal,
    ];

    fn named(name: &str) -> Shape {
        match name {
            "uniform" => Shape::Uniform,
            "triangular" => Shape::Triangular,
            "normal" => Shape::Normal,
            "lognormal" => Shape::LogNormal,
            _ => panic!("{name}"),
        }
    }

    #[test]
    fn quantiles_are_those_of_scipy() {
        let table = include_str!("../../tests/data/distribution_quantiles.csv");
        let mut rows = 0;
        for line in table.lines().filter(|line| !line.starts_with('#')).skip(1) {
            let cells: Vec<&str> = line.split(',').collect();
            let number = |at: usize| cells[at].parse::<f64>().expect("a number");
            let ends = [number(1), number(2), number(3)];
            let found = named(cells[0]).at(ends, 2.0 * number(4) - 1.0);
            // SciPy inverts the cut distributions to about 1e-12; near an end the quantile itself
            // goes as steeply as 1e4 of the rounding of 2u − 1.
            assert!((found / number(5) - 1.0).abs() < 1e-10, "{line}: {found}");
            rows += 1;
        }
        assert!(rows > 30, "{rows}");
    }

    proptest! {
        #![proptest_config(crate::fixed_cases(256))]

        #[test]
        fn every_shape_rises_within_its_ends(
            nominal in 1e-6..1e6f64, below in 0.0..0.99f64, above in 0.0..20.0f64,
            one in -1.0..=1.0f64, other in -1.0..=1.0f64,
        ) {
            let ends = [nominal * (1.0 - below), nominal, nominal * (1.0 + above)];
            let (left, right) = if one < other { (one, other) } else { (other, one) };
            for shape in SHAPES {
                let [left, right] = [left, right].map(|place| shape.at(ends, place));
                let room = 1e-12 * ends[2];
                prop_assert!(left <= right + room, "{shape:?} {left} {right}");
                prop_assert!(ends[0] - room <= left && right <= ends[2] + room, "{shape:?}");
                prop_assert!((shape.at(ends, 0.0) - nominal).abs() <= 1e-12 * nominal);
            }
        }
    }
}
