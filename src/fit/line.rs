//! Polynomials through weighted points by least squares.

use nalgebra::{DMatrix, DVector};

/// One point of a regression.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Where.
    pub x: f64,
    /// What was found there.
    pub y: f64,
    /// Inverse of the variance, or anything in proportion to it.
    pub weight: f64,
}

/// A polynomial through weighted points.
#[derive(Clone, Debug)]
pub struct Regression {
    /// Where the powers count from.
    pub centre: f64,
    /// Coefficients, lowest power first.
    pub coefficients: Vec<f64>,
    /// `(Xᵀ W X)⁻¹`: the covariance of the coefficients for weights of unit variance.
    pub inverse: DMatrix<f64>,
    /// Σ w r².
    pub chi_squared: f64,
    /// Points less coefficients.
    pub degrees: usize,
}

impl Regression {
    /// The polynomial of this degree nearest to the points; none where they do not fix it.
    ///
    /// ```text
    /// min Σ wᵢ (yᵢ − Σ βⱼ (xᵢ − x₀)ʲ)²,   √W X = Q R,   β = R⁻¹ Qᵀ √W y
    /// ```
    ///
    /// Valid: more points than coefficients, weights that are inverse variances.
    /// Source: weighted least squares by the factors of Q and R, textbook.
    /// Checked: `certified_regression_is_met`, `weighted_lines_are_those_of_numpy`.
    pub fn of(points: &[Point], centre: f64, degree: usize) -> Option<Self> {
        let (count, terms) = (points.len(), degree + 1);
        if count < terms {
            return None;
        }
        let root = |row: usize| points[row].weight.sqrt();
        let design = DMatrix::from_fn(count, terms, |row, power| {
            root(row) * (points[row].x - centre).powi(power as i32)
        });
        let seen = DVector::from_fn(count, |row, _| root(row) * points[row].y);
        let (q, r) = design.clone().qr().unpack();
        let least = |at: usize| r[(at, at)].abs() > 1e-12 * design.column(at).norm();
        if !(0..terms).all(least) {
            return None;
        }
        let back = r.try_inverse()?;
        let coefficients = &back * (q.transpose() * &seen);
        let misses = seen - design * &coefficients;
        Some(Self {
            centre,
            coefficients: coefficients.iter().copied().collect(),
            inverse: &back * back.transpose(),
            chi_squared: misses.norm_squared(),
            degrees: count - terms,
        })
    }

    /// The polynomial at a place.
    pub fn at(&self, x: f64) -> f64 {
        let powers = self.coefficients.iter().rev();
        powers.fold(0.0, |sum, coefficient| {
            sum * (x - self.centre) + coefficient
        })
    }

    /// Variance of the polynomial at a place for weights of unit variance: `xᵀ (Xᵀ W X)⁻¹ x`.
    pub fn leverage(&self, x: f64) -> f64 {
        let terms = self.coefficients.len();
        let row = DVector::from_fn(terms, |power, _| (x - self.centre).powi(power as i32));
        row.dot(&(&self.inverse * &row))
    }

    /// Mean of `w r²` over the degrees of freedom; none without any.
    pub fn reduced(&self) -> Option<f64> {
        (self.degrees > 0).then(|| self.chi_squared / self.degrees as f64)
    }

    /// A point's distance from the polynomial over the standard deviation of that distance, when
    /// `scale` is the variance of unit weight.
    ///
    /// A point the polynomial was fitted to pulled it along, one left out did not.
    pub fn studentised(&self, point: &Point, scale: f64, part: Part) -> f64 {
        let drawn = point.weight * self.leverage(point.x);
        let share = match part {
            Part::Fitted => 1.0 - drawn,
            Part::LeftOut => 1.0 + drawn,
        };
        (point.y - self.at(point.x)) * (point.weight / (scale * share)).sqrt()
    }
}

/// Whether a polynomial was fitted to a point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Part {
    /// It was.
    Fitted,
    /// It was not.
    LeftOut,
}

/// Weighted mean of the places.
pub fn centre(points: &[Point]) -> f64 {
    let sum: f64 = points.iter().map(|point| point.weight).sum();
    points
        .iter()
        .map(|point| point.weight * point.x)
        .sum::<f64>()
        / sum
}

#[cfg(test)]
mod tests {
    use super::*;

    fn points(rows: &[(f64, f64, f64)]) -> Vec<Point> {
        let point = |&(x, y, sd): &(f64, f64, f64)| Point {
            x,
            y,
            weight: sd.powi(-2),
        };
        rows.iter().map(point).collect()
    }

    /// NIST's reference data set Norris: data and certified values as public test suites quote them
    /// (seen there, not on the pages of NIST).
    #[test]
    fn certified_regression_is_met() {
        let text = include_str!("../../tests/data/fit/norris.csv");
        let rows: Vec<(f64, f64, f64)> = text
            .lines()
            .skip(1)
            .map(|line| {
                let (x, y) = line.split_once(',').unwrap();
                (x.trim().parse().unwrap(), y.trim().parse().unwrap(), 1.0)
            })
            .collect();
        assert_eq!(rows.len(), 36);
        let line = Regression::of(&points(&rows), 0.0, 1).unwrap();
        let scale = line.reduced().unwrap();
        let sd = |at: usize| (scale * line.inverse[(at, at)]).sqrt();
        // The condition of these data costs two or three of sixteen digits.
        for (found, certified) in [
            (line.coefficients[0], -0.262323073774029),
            (line.coefficients[1], 1.00211681802045),
            (sd(0), 0.232818234301152),
            (sd(1), 0.429796848199937e-3),
            (scale.sqrt(), 0.884796396144373),
            (line.chi_squared, 26.6173985294224),
        ] {
            assert!(
                (found / certified - 1.0).abs() < 1e-11,
                "{found} {certified}"
            );
        }
    }

    /// NumPy 2.4.6: `polyfit(x, y, degree, w=1/sd, cov="unscaled")`.
    #[test]
    fn weighted_lines_are_those_of_numpy() {
        let rows = [
            (0.5, 1.2, 0.1),
            (1.0, 1.9, 0.2),
            (1.7, 3.4, 0.15),
            (2.2, 3.9, 0.4),
            (3.0, 6.1, 0.3),
        ];
        let rows = points(&rows);
        let line = Regression::of(&rows, 0.0, 1).unwrap();
        let parabola = Regression::of(&rows, 0.0, 2).unwrap();
        // Rounding alone.
        let close = |found: f64, expected: f64| {
            assert!((found / expected - 1.0).abs() < 1e-11, "{found} {expected}");
        };
        close(line.coefficients[0], 2.149002351555479e-01);
        close(line.coefficients[1], 1.875234844494581e+00);
        close(line.inverse[(0, 0)], 1.659227677849343e-02);
        close(line.inverse[(1, 1)], 1.004076858952293e-02);
        close(line.inverse[(0, 1)], -1.062305851516069e-02);
        close(parabola.coefficients[0], 4.301684726359782e-01);
        close(parabola.coefficients[1], 1.446094513654175e+00);
        close(parabola.coefficients[2], 1.444843477795015e-01);
        close(parabola.inverse[(0, 0)], 5.349585666680989e-02);
        close(parabola.inverse[(1, 1)], 1.566992726870824e-01);
        close(parabola.inverse[(2, 2)], 1.662456120561563e-02);
        close(parabola.inverse[(0, 1)], -8.419087635873461e-02);
    }

    #[test]
    fn the_centre_moves_no_value() {
        let rows = points(&[
            (1.0, 2.0, 0.1),
            (2.0, 2.5, 0.2),
            (4.0, 4.5, 0.1),
            (5.0, 4.0, 0.3),
        ]);
        let (here, there) = (
            Regression::of(&rows, 0.0, 1).unwrap(),
            Regression::of(&rows, centre(&rows), 1).unwrap(),
        );
        for x in [0.0, 1.5, 7.0] {
            // Rounding alone.
            assert!((here.at(x) - there.at(x)).abs() < 1e-12);
            assert!((here.leverage(x) - there.leverage(x)).abs() < 1e-12);
        }
        // About the weighted mean height and slope are independent.
        assert!(there.inverse[(0, 1)].abs() < 1e-15);
    }

    #[test]
    fn points_at_one_place_fix_no_slope() {
        let rows = points(&[(1.0, 2.0, 0.1), (1.0, 2.5, 0.2), (1.0, 2.7, 0.2)]);
        assert!(Regression::of(&rows, 0.0, 1).is_none());
        assert!(Regression::of(&rows, 1.0, 1).is_none());
        assert!(Regression::of(&rows, 1.0, 0).is_some());
    }
}
