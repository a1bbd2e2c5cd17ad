//! Quadratic surface through the points of a fixed design in a few variables.

/// `y = y₀ + Σ a_i x_i + Σ b_i x_i² + Σ_{i<j} c_ij x_i x_j`.
///
/// | symbol | quantity | field |
/// |---|---|---|
/// | `x_i` | departure of variable i from the centre | argument |
/// | `a_i`, `b_i` | slope and curvature along i | `along` |
/// | `c_ij` | twist between i and j, `i < j` | `twist` |
///
/// Exact for polynomials of second order; elsewhere an interpolation whose error is to be found by
/// the caller at points that are not in the design.
/// Checked: `quadratics_are_met_exactly`.
#[derive(Clone, Debug, PartialEq)]
pub struct Surface {
    centre: f64,
    along: Vec<[f64; 2]>,
    twist: Vec<f64>,
}

/// Points of the design for steps along each variable: the centre, a step up and a step down along
/// each, a step up along each pair.
///
/// `1 + 2n + n(n − 1)/2` points of n values each, in the order that [`Surface::through`] takes.
pub fn design(steps: &[f64]) -> Vec<Vec<f64>> {
    let centre = vec![0.0; steps.len()];
    let moved = |moves: &[(usize, f64)]| {
        let mut point = centre.clone();
        for (variable, to) in moves {
            point[*variable] = *to;
        }
        point
    };
    let mut points = vec![centre.clone()];
    for (variable, step) in steps.iter().enumerate() {
        points.push(moved(&[(variable, *step)]));
        points.push(moved(&[(variable, -step)]));
    }
    for (one, first) in steps.iter().enumerate() {
        for (other, second) in steps.iter().enumerate().skip(one + 1) {
            points.push(moved(&[(one, *first), (other, *second)]));
        }
    }
    points
}

impl Surface {
    /// The surface through values at the points of [`design`], in its order; steps are not zero.
    ///
    /// Values of the pairs may be left out: no twist is taken then.
    pub fn through(steps: &[f64], values: &[f64]) -> Self {
        let centre = values[0];
        let along: Vec<[f64; 2]> = steps
            .iter()
            .enumerate()
            .map(|(variable, step)| {
                let (up, down) = (values[1 + 2 * variable], values[2 + 2 * variable]);
                [
                    (up - down) / (2.0 * step),
                    (up - 2.0 * centre + down) / (2.0 * step * step),
                ]
            })
            .collect();
        let mut surface = Self {
            centre,
            along,
            twist: Vec::new(),
        };
        let mut corners = values[1 + 2 * steps.len()..].iter();
        for (one, first) in steps.iter().enumerate() {
            for (other, second) in steps.iter().enumerate().skip(one + 1) {
                let apart = centre + surface.part(one, *first) + surface.part(other, *second);
                let corner = corners.next().map_or(apart, |value| *value);
                surface.twist.push((corner - apart) / (first * second));
            }
        }
        surface
    }

    /// This surface with the twists of another over the same variables.
    ///
    /// Serves where only the points along the variables are known.
    #[must_use]
    pub fn with_twist_of(mut self, other: &Self) -> Self {
        self.twist.clone_from(&other.twist);
        self
    }

    /// The value at a departure from the centre.
    pub fn at(&self, point: &[f64]) -> f64 {
        let mut value = self.centre;
        let mut twists = self.twist.iter();
        for (one, x) in point.iter().enumerate() {
            value += self.part(one, *x);
            for (y, twist) in point[one + 1..].iter().zip(&mut twists) {
                value += twist * x * y;
            }
        }
        value
    }

    /// The coefficients: `y₀`, the pairs of `a_i` and `b_i`, and the `c_ij` in the order of the pairs
    /// (0 1), (0 2), …, (1 2), ….
    pub fn coefficients(&self) -> (f64, &[[f64; 2]], &[f64]) {
        (self.centre, &self.along, &self.twist)
    }

    fn part(&self, variable: usize, x: f64) -> f64 {
        let [slope, curvature] = self.along[variable];
        x * (slope + curvature * x)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn quadratic(x: &[f64]) -> f64 {
        3.0 - x[0] + 2.0 * x[1] + 0.5 * x[0] * x[0] - 4.0 * x[2] * x[2] + 7.0 * x[0] * x[1]
            - 1.5 * x[1] * x[2]
    }

    #[test]
    fn quadratics_are_met_exactly() {
        let steps = [0.3, 0.7, 0.1];
        let values: Vec<f64> = design(&steps)
            .iter()
            .map(|point| quadratic(point))
            .collect();
        assert_eq!(values.len(), 10);
        let surface = Surface::through(&steps, &values);
        for point in [[0.2, -0.4, 0.9], [-1.0, 2.0, 0.3], [0.0; 3]] {
            let off = surface.at(&point) - quadratic(&point);
            // Rounding only: divided differences over steps of 0.1.
            assert!(off.abs() < 1e-11, "{off:e}");
        }
    }

    #[test]
    fn no_variable_leaves_the_centre() {
        let surface = Surface::through(&[], &[5.0]);
        assert!((surface.at(&[]) - 5.0).abs() < f64::EPSILON);
    }
}
