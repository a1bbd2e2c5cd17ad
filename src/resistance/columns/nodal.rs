//! Pressures at the columns themselves, out of the means that a contact on columns hands over.

use crate::numerics::columns::{Plan, Region};

/// Values at the columns out of means over their bilinear functions, none below zero.
///
/// ```text
/// p_i = ∫ N_i p dA / ∫ N_i dA             what the contact tells
/// p′  = p + (p − M_L⁻¹ M p)               M_ij = ∫ N_i N_j dA,   M_L = diag ∫ N_i dA
/// ```
///
/// | symbol | quantity | SI unit | argument |
/// |---|---|---|---|
/// | `p` | mean pressure of a column | Pa | `means` |
/// | `N_i` | bilinear function of a column | 1 | `plan` |
/// | `A` | faying area | m² | `region` |
///
/// A mean reaches a cell far and so smears the edge of contact outwards, where nearly all heat of a bare
/// joint crosses. This takes the mean of the means and goes as far the other way. What falls below zero
/// is set to zero, and the rest carries the force of all.
///
/// Valid: a smooth field that ends at an edge; exact for a field that is linear on even lines, inside.
/// Source: one step of van Cittert's iteration (1931), here on the mass matrix; this project's check
/// against the round solver.
/// Checked: `a_linear_field_comes_back`, `the_force_stays`, `tests/validation_contact_edge.rs`.
pub fn nodal(plan: &Plan, region: &Region, means: &[f64]) -> Vec<f64> {
    let mut moments = vec![0.0; plan.columns()];
    let shares = region.shares();
    for (cell, share) in shares.iter().enumerate() {
        let corners = plan.corners(cell);
        // Where nothing presses there is nothing to undo.
        if *share <= 0.0 || corners.iter().all(|column| means[*column] <= 0.0) {
            continue;
        }
        let masses = region.masses(plan, cell);
        for (column, row) in corners.iter().zip(&masses) {
            for (other, mass) in corners.iter().zip(row) {
                moments[*column] += mass * (means[*column] - means[*other]);
            }
        }
    }
    let weights = region.weights(plan);
    let force = |values: &[f64]| -> f64 { values.iter().zip(&weights).map(|(p, w)| p * w).sum() };
    let mut values: Vec<f64> = means
        .iter()
        .zip(moments.iter().zip(&weights))
        .map(|(mean, (moment, weight))| {
            if *weight > 0.0 {
                (mean + moment / weight).max(0.0)
            } else {
                *mean
            }
        })
        .collect();
    let carried = force(&values);
    if carried > 0.0 {
        let scale = force(means) / carried;
        for value in &mut values {
            *value *= scale;
        }
    }
    values
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numerics::columns::Disc;

    fn lines(count: usize, growth: f64) -> Vec<f64> {
        let mut lines = vec![0.0];
        for step in 0..count {
            lines.push(lines[step] + growth.powi(i32::try_from(step).unwrap()));
        }
        lines
    }

    /// Means of a field over the functions of the columns, by the samples of the region.
    fn means(plan: &Plan, region: &Region, field: impl Fn([f64; 2]) -> f64) -> Vec<f64> {
        let mut sums = vec![[0.0; 2]; plan.columns()];
        for cell in 0..plan.cells() {
            region.each_sample(plan, cell, |place, area| {
                for (column, share) in plan.around(place).unwrap() {
                    sums[column][0] += share * area * field(place);
                    sums[column][1] += share * area;
                }
            });
        }
        let mean = |[sum, area]: [f64; 2]| if area > 0.0 { sum / area } else { 0.0 };
        sums.into_iter().map(mean).collect()
    }

    fn force(plan: &Plan, region: &Region, values: &[f64]) -> f64 {
        let weights = region.weights(plan);
        values.iter().zip(&weights).map(|(p, w)| p * w).sum()
    }

    #[test]
    fn a_linear_field_comes_back() {
        let plan = Plan::new(lines(9, 1.0), lines(7, 1.0));
        let whole = Region::sample(&plan, &|_| true);
        let field = |[x, y]: [f64; 2]| 50.0 + 3.0 * x - 2.0 * y;
        let found = nodal(&plan, &whole, &means(&plan, &whole, field));
        for (column, found) in found.iter().enumerate() {
            let place = plan.place(column);
            let inside = (1.5..7.5).contains(&place[0]) && (1.5..5.5).contains(&place[1]);
            if inside {
                let off = found - field(place);
                // Rounding of sums of 1024 samples.
                assert!(off.abs() < 1e-10, "{place:?}: {off}");
            }
        }
        // On lines that grow by a tenth the means lie off by slope × (difference of the sides) / 3, and
        // a tenth of that is left, since the difference grows by as much from line to line.
        let plan = Plan::new(lines(20, 1.1), lines(4, 1.0));
        let whole = Region::sample(&plan, &|_| true);
        let field = |[x, _]: [f64; 2]| 50.0 + x;
        let told = means(&plan, &whole, field);
        let found = nodal(&plan, &whole, &told);
        let at = plan.column(12, 2);
        let off = |values: &[f64]| (values[at] - field(plan.place(at))).abs();
        assert!(off(&told) > 0.05, "{}", off(&told));
        assert!(
            off(&found) < 0.1 * off(&told),
            "{} {}",
            off(&found),
            off(&told)
        );
    }

    #[test]
    fn the_force_stays() {
        let plan = Plan::new(lines(12, 1.07), lines(12, 1.05));
        let hole = Disc {
            centre: [7.0, 6.0],
            radius: 1.4,
        };
        let faces = Region::sample(&plan, &|_| true).without(&Region::discs(&plan, &[hole]));
        // A cone of pressure that ends inside the faces and has a hole.
        let cone = |[x, y]: [f64; 2]| (4.0 - (x - 7.0).hypot(y - 6.0)).max(0.0);
        let told = means(&plan, &faces, cone);
        let found = nodal(&plan, &faces, &told);
        let before = force(&plan, &faces, &told);
        let after = force(&plan, &faces, &found);
        assert!((after / before - 1.0).abs() < 1e-12, "{before} {after}");
        assert!(found.iter().all(|value| *value >= 0.0));
        // Beyond the edge of contact the means reach a cell far; the values less.
        let touched = |values: &[f64]| values.iter().filter(|value| **value > 0.0).count();
        assert!(
            touched(&found) < touched(&told),
            "{} {}",
            touched(&found),
            touched(&told)
        );
        // And they are nearer to the field where it is smooth.
        let worst = |values: &[f64]| -> f64 {
            (0..plan.columns())
                .map(|column| (column, plan.place(column)))
                .filter(|(_, [x, y])| (2.2..5.0).contains(&(x - 7.0).hypot(y - 6.0)))
                .map(|(column, place)| (values[column] - cone(place)).abs())
                .fold(0.0, f64::max)
        };
        assert!(
            worst(&found) < worst(&told),
            "{} {}",
            worst(&found),
            worst(&told)
        );
    }

    #[test]
    fn an_even_field_is_left_as_it_is() {
        let plan = Plan::new(lines(6, 1.2), lines(6, 1.0));
        let hole = Disc {
            centre: [3.0, 3.0],
            radius: 1.1,
        };
        let faces = Region::sample(&plan, &|_| true).without(&Region::discs(&plan, &[hole]));
        let weights = faces.weights(&plan);
        let told: Vec<f64> = weights
            .iter()
            .map(|w| if *w > 0.0 { 5.0 } else { 0.0 })
            .collect();
        for (found, told) in nodal(&plan, &faces, &told).iter().zip(&told) {
            assert!((found - told).abs() < 1e-12, "{found} {told}");
        }
    }
}
