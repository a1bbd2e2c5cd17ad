//! Where contact ends, from how pressure vanishes.

use nalgebra::{DMatrix, DVector};

/// Radius at which p² runs out, from the pressure on grid lines; the rim where it does not.
///
/// At the edge of a receding contact p = √(c − r) (α₀ + α₁ (c − r) + …), so that p² is smooth and
/// crosses zero with a slope. The straight elements do not follow the root in the last two columns,
/// which are left out of the fit.
pub(super) fn contact_edge(radii: &[f64], pressure: &[f64], reach: f64) -> f64 {
    let rim = radii.len() - 1;
    let Some(last) = pressure.iter().rposition(|p| *p > 0.0) else {
        return f64::NAN;
    };
    if last == rim {
        return radii[rim];
    }
    let end = radii[last + 1];
    let points: Vec<(f64, f64)> = (0..last.saturating_sub(SKIPPED - 1))
        .filter(|line| radii[*line] > end - reach)
        .map(|line| ((radii[line] - end) / reach, pressure[line].powi(2)))
        .collect();
    let root = (1..=HIGHEST_DEGREE)
        .rev()
        .find(|degree| points.len() >= degree + 2)
        .and_then(|degree| fitted(&points, degree))
        .and_then(|polynomial| root(&polynomial));
    match root {
        Some(x) => (end + reach * x).min(radii[rim]),
        None => end,
    }
}

/// Lines before the edge that are left out.
const SKIPPED: usize = 2;
/// Degree of the fit where enough lines stand behind the edge.
const HIGHEST_DEGREE: usize = 3;

/// Least-squares polynomial through points, constant first.
fn fitted(points: &[(f64, f64)], degree: usize) -> Option<DVector<f64>> {
    let powers = DMatrix::from_fn(points.len(), degree + 1, |row, column| {
        points[row].0.powi(column as i32)
    });
    let values = DVector::from_iterator(points.len(), points.iter().map(|point| point.1));
    powers.svd(true, true).solve(&values, 0.0).ok()
}

/// Root nearest to zero, by Newton steps from zero; none where they do not settle nearby.
fn root(polynomial: &DVector<f64>) -> Option<f64> {
    let mut x: f64 = 0.0;
    for _ in 0..30 {
        let (mut value, mut slope) = (0.0, 0.0);
        for coefficient in polynomial.iter().rev() {
            slope = slope * x + value;
            value = value * x + coefficient;
        }
        let step = value / slope;
        x -= step;
        if step.abs() < 1e-12 {
            return (x.abs() < 1.0).then_some(x);
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;

    // 1e-9: p² is a cubic here, which the fit reproduces.
    #[test]
    fn square_root_law_gives_its_edge() {
        let (edge, step) = (1.437, 0.021);
        let radii: Vec<f64> = (0..40).map(|line| 0.9 + f64::from(line) * step).collect();
        let pressure: Vec<f64> = radii
            .iter()
            .map(|r| (edge - r).max(0.0).sqrt() * (1.0 + 0.4 * (edge - r)))
            .collect();
        let found = contact_edge(&radii, &pressure, 0.3);
        assert!((found - edge).abs() < 1e-9, "{found}");
    }

    #[test]
    fn pressure_up_to_the_rim_puts_the_edge_there() {
        let found = contact_edge(&[1.0, 1.5, 2.0], &[1.0, 0.9, 0.8], 0.3);
        assert!((found - 2.0).abs() < f64::EPSILON);
    }

    #[test]
    fn too_few_lines_fall_back_on_the_grid() {
        let found = contact_edge(&[1.0, 1.5, 2.0, 2.5], &[1.0, 0.9, 0.0, 0.0], 0.3);
        assert!((found - 2.0).abs() < f64::EPSILON);
        assert!(contact_edge(&[1.0, 1.5], &[0.0, 0.0], 0.3).is_nan());
    }
}
