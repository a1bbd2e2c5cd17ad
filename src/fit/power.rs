//! A power law through measured points, with what it leaves open.

use crate::{
    fit::{
        CONFIDENCE, SIGNIFICANCE,
        line::{Point, Regression, centre},
        readings::Reading,
    },
    numerics::test_statistics::{chi_squared_tail, student_quantile, student_tails},
};

/// Whether the stated standard deviations agree with the residuals.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Agreement {
    /// Σ (r/σ)².
    pub chi_squared: f64,
    /// The same over the degrees of freedom.
    pub reduced: f64,
    /// Chance of more than that, 0 to 1.
    pub chance: f64,
}

impl Agreement {
    fn of(line: &Regression) -> Option<Self> {
        Some(Self {
            chi_squared: line.chi_squared,
            reduced: line.reduced()?,
            chance: chi_squared_tail(line.chi_squared, line.degrees as f64),
        })
    }

    /// The points scatter more than is stated.
    pub fn too_small(&self) -> bool {
        self.chance < 0.5 * SIGNIFICANCE
    }

    /// The points scatter less than is stated.
    pub fn too_large(&self) -> bool {
        self.chance > 1.0 - 0.5 * SIGNIFICANCE
    }
}

/// Whether the points bend away from the power law.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bend {
    /// Change of the exponent per factor e of the abscissa.
    pub curvature: f64,
    /// Chance of so much bend from points of a power law, 0 to 1.
    pub chance: f64,
}

impl Bend {
    /// More than chance.
    pub fn shows(&self) -> bool {
        self.chance < SIGNIFICANCE
    }
}

/// A power law `y = coefficient (x/reference)^exponent` and what the points leave open.
#[derive(Clone, Debug, PartialEq)]
pub struct PowerLaw {
    /// Number of points.
    pub count: usize,
    /// Weighted geometric mean of the abscissas, SI; there coefficient and exponent are independent.
    pub reference: f64,
    /// Value at the reference, SI.
    pub coefficient: f64,
    /// Exponent.
    pub exponent: f64,
    /// Covariance of (ln coefficient, exponent).
    pub covariance: [[f64; 2]; 2],
    /// Standard deviation of one point about the law, in ln y.
    pub scatter: f64,
    /// Points less coefficients.
    pub degrees: usize,
    /// Standard deviations that bound 90 % of either side's band: Student's t, or the normal.
    pub reach: f64,
    /// Stated standard deviations against residuals; none where none are stated.
    pub agreement: Option<Agreement>,
    /// Test of bend; none below five points or three places.
    pub bend: Option<Bend>,
    /// Least and largest abscissa, SI.
    pub range: [f64; 2],
}

impl PowerLaw {
    /// The power law nearest to the readings, in logarithms; none where they do not fix one.
    ///
    /// ```text
    /// ln y = ln C + n ln(x/x₀) + e,   e ~ N(0, σ²)
    /// σ stated:      weights (y/σ)², covariance (Xᵀ W X)⁻¹, normal reach
    /// σ not stated:  equal weights, σ² = Σ r²/(N − 2), Student's t with N − 2 degrees
    /// ```
    ///
    /// Where the points scatter more than is stated, and by more than chance, covariance and
    /// scatter are widened by χ²/(N − 2) and the reach is Student's.
    ///
    /// Valid: readings above zero at two places at least, scatter of one size in logarithms.
    /// Source: weighted least squares, textbook.
    /// Checked: `known_laws_are_recovered_in_nine_of_ten`, `weighted_lines_are_those_of_numpy`.
    pub fn of(readings: &[Reading]) -> Option<Self> {
        let points = points(readings);
        let middle = centre(&points);
        let line = Regression::of(&points, middle, 1)?;
        let stated = stated(readings);
        if !stated && line.degrees == 0 {
            return None;
        }
        let agreement = stated.then(|| Agreement::of(&line)).flatten();
        let from_residuals = !stated || agreement.is_some_and(|found| found.too_small());
        let (widening, freedom) = if from_residuals {
            (line.reduced()?, line.degrees as f64)
        } else {
            (1.0, f64::INFINITY)
        };
        let variances = points.iter().map(|point| point.weight.recip());
        let mean_variance = variances.sum::<f64>() / points.len() as f64;
        let covariance = [0, 1].map(|row| [0, 1].map(|at| widening * line.inverse[(row, at)]));
        let places = || points.iter().map(|point| point.x);
        Some(Self {
            count: points.len(),
            reference: middle.exp(),
            coefficient: line.coefficients[0].exp(),
            exponent: line.coefficients[1],
            covariance,
            scatter: (widening * mean_variance).sqrt(),
            degrees: line.degrees,
            reach: student_quantile(f64::midpoint(1.0, CONFIDENCE), freedom),
            agreement,
            bend: bend(&points, (middle, stated)),
            range: [
                places().fold(f64::INFINITY, f64::min).exp(),
                places().fold(f64::NEG_INFINITY, f64::max).exp(),
            ],
        })
    }

    /// The law at an abscissa.
    pub fn at(&self, x: f64) -> f64 {
        self.coefficient * (x / self.reference).powf(self.exponent)
    }

    /// Standard deviation of ln of the law at an abscissa.
    pub fn deviation(&self, x: f64) -> f64 {
        let u = (x / self.reference).ln();
        let [[height, both], [_, slope]] = self.covariance;
        (height + 2.0 * u * both + u * u * slope).max(0.0).sqrt()
    }

    /// Where the law lies at an abscissa, with 90 % confidence.
    pub fn band(&self, x: f64) -> [f64; 2] {
        self.around(x, self.deviation(x))
    }

    /// Where another reading would lie at an abscissa, with 90 % probability.
    pub fn prediction(&self, x: f64) -> [f64; 2] {
        self.around(x, self.deviation(x).hypot(self.scatter))
    }

    fn around(&self, x: f64, deviation: f64) -> [f64; 2] {
        let factor = (self.reach * deviation).exp();
        [self.at(x) / factor, self.at(x) * factor]
    }

    /// How far another joint of the kind may be off: one standard deviation as a factor, scatter of
    /// the points and the law's own uncertainty at its worse end together.
    pub fn factor(&self) -> f64 {
        let ends = self.range.map(|end| self.deviation(end));
        self.scatter.hypot(ends[0].max(ends[1])).exp()
    }
}

/// Readings as points in logarithms; equal weights where any lacks its standard deviation.
pub(super) fn points(readings: &[Reading]) -> Vec<Point> {
    let stated = stated(readings);
    readings
        .iter()
        .filter_map(|reading| {
            Some(Point {
                x: reading.abscissa?.ln(),
                y: reading.conductance.ln(),
                weight: reading
                    .deviation
                    .filter(|_| stated)
                    .map_or(1.0, |sd| sd.powi(-2)),
            })
        })
        .collect()
}

/// Whether every reading states its standard deviation.
pub(super) fn stated(readings: &[Reading]) -> bool {
    readings.iter().all(|reading| reading.deviation.is_some())
}

/// Test of a square term in ln x.
fn bend(points: &[Point], (middle, stated): (f64, bool)) -> Option<Bend> {
    const FEWEST: usize = 5;
    if points.len() < FEWEST {
        return None;
    }
    let parabola = Regression::of(points, middle, 2)?;
    let scale = parabola.reduced()?;
    let (scale, freedom) = if stated && scale < 1.0 {
        (1.0, f64::INFINITY)
    } else {
        (scale, parabola.degrees as f64)
    };
    let curvature = parabola.coefficients[2];
    let deviation = (scale * parabola.inverse[(2, 2)]).sqrt();
    (deviation > 0.0).then(|| Bend {
        curvature: 2.0 * curvature,
        chance: student_tails(curvature / deviation, freedom),
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fit::tests::normals;

    fn readings(rows: &[(f64, f64, Option<f64>)]) -> Vec<Reading> {
        let reading = |&(x, y, sd): &(f64, f64, Option<f64>)| Reading {
            line: 1,
            abscissa: Some(x),
            conductance: y,
            deviation: sd,
            direction: None,
            specimen: None,
        };
        rows.iter().map(reading).collect()
    }

    /// Share of 500 made sets in which each 90 % interval holds the truth: ln C, n, the curve at
    /// the end of the range, and another reading there.
    fn shares(stated: bool) -> [f64; 4] {
        const SETS: u64 = 500;
        let (c, n) = (4.0e4_f64, 0.93);
        let mut held = [0_u32; 4];
        for seed in 0..SETS {
            let noise = normals(seed + 1, 13);
            let rows: Vec<(f64, f64, Option<f64>)> = (0..12)
                .map(|at| {
                    let x = 1e6 * 1.3_f64.powi(at);
                    let sd = if stated {
                        0.03 + 0.01 * f64::from(at % 4)
                    } else {
                        0.05
                    };
                    let y = c * (x / 1e7).powf(n) * (sd * noise[at as usize]).exp();
                    (x, y, stated.then_some(sd))
                })
                .collect();
            let law = PowerLaw::of(&readings(&rows)).unwrap();
            let true_height = c * (law.reference / 1e7).powf(n);
            let end = law.range[1];
            let truth = c * (end / 1e7).powf(n);
            let another = truth * (law_scatter(stated) * noise[12]).exp();
            let inside = |[low, high]: [f64; 2], value: f64| low <= value && value <= high;
            let reach = |at: usize| law.reach * law.covariance[at][at].sqrt();
            let holds = [
                (law.coefficient / true_height).ln().abs() <= reach(0),
                (law.exponent - n).abs() <= reach(1),
                inside(law.band(end), truth),
                inside(law.prediction(end), another),
            ];
            for (count, held_here) in held.iter_mut().zip(holds) {
                *count += u32::from(held_here);
            }
        }
        held.map(|count| f64::from(count) / SETS as f64)
    }

    /// Root mean square of the scatter of the made readings.
    fn law_scatter(stated: bool) -> f64 {
        if stated {
            [0.03_f64, 0.04, 0.05, 0.06]
                .iter()
                .map(|s| s * s / 4.0)
                .sum::<f64>()
                .sqrt()
        } else {
            0.05
        }
    }

    #[test]
    fn known_laws_are_recovered_in_nine_of_ten() {
        for stated in [true, false] {
            let shares = shares(stated);
            // 90 % of 500 by chance: ± 2.2 % at 90 % confidence.
            assert!(
                shares.iter().all(|share| (0.87..=0.93).contains(share)),
                "{stated} {shares:?}"
            );
        }
    }

    /// SciPy 1.17.1: `curve_fit(a + n ln x, x, ln y, sigma=sd, absolute_sigma=True)`.
    #[test]
    fn a_power_law_is_that_of_scipy() {
        let rows = [
            (1.0, 5.2, Some(0.02)),
            (2.0, 9.1, Some(0.05)),
            (4.0, 18.5, Some(0.04)),
            (8.0, 31.0, Some(0.03)),
        ];
        let law = PowerLaw::of(&readings(&rows)).unwrap();
        // curve_fit stops at a relative change of 1e-8.
        for (found, expected) in [
            (law.at(1.0).ln(), 1.649580512430e+00),
            (law.exponent, 8.674889093739e-01),
            (law.covariance[1][1].sqrt(), 1.661077306575e-02),
            (law.deviation(1.0), 1.920583714834e-02),
            (law.agreement.unwrap().chi_squared, 3.839244604984e+00),
        ] {
            assert!((found / expected - 1.0).abs() < 1e-6, "{found} {expected}");
        }
    }

    #[test]
    fn misstated_deviations_are_seen_and_widen_the_bands() {
        let noise = normals(7, 15);
        let set = |sd: f64| {
            let rows: Vec<(f64, f64, Option<f64>)> = (0..15)
                .map(|at| {
                    let x = 1.0 + at as f64;
                    (x, x.powf(0.9) * (0.05 * noise[at]).exp(), Some(sd))
                })
                .collect();
            PowerLaw::of(&readings(&rows)).unwrap()
        };
        let (narrow, right, wide) = (set(0.01), set(0.05), set(0.3));
        assert!(narrow.agreement.unwrap().too_small());
        assert!(wide.agreement.unwrap().too_large());
        assert!(!right.agreement.unwrap().too_small() && !right.agreement.unwrap().too_large());
        // The residuals decide, whatever too small a deviation was stated.
        assert!(
            (narrow.scatter / right.scatter - 1.0).abs() < 0.5,
            "{}",
            narrow.scatter
        );
    }

    #[test]
    fn a_bent_curve_shows() {
        let rows: Vec<(f64, f64, Option<f64>)> = (1..12)
            .map(|at| {
                let x = f64::from(at);
                let wiggle = 1.0 + 0.01 * f64::from(at % 3 - 1);
                (x, wiggle / (0.1 + 1.0 / x), None)
            })
            .collect();
        let law = PowerLaw::of(&readings(&rows)).unwrap();
        assert!(law.bend.unwrap().shows());
        assert!(law.bend.unwrap().curvature < 0.0);
    }

    #[test]
    fn two_points_without_deviations_tell_no_scatter() {
        assert!(PowerLaw::of(&readings(&[(1.0, 2.0, None), (2.0, 3.0, None)])).is_none());
        assert!(PowerLaw::of(&readings(&[(1.0, 2.0, Some(0.1)), (2.0, 3.0, Some(0.1))])).is_some());
    }
}
