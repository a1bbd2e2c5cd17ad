//! How the resistances answer to bolts that do not clamp alike.

use crate::{
    estimate::chain::elastic::response::{LEAST_FORCE, Readings, readings},
    resistance::Path,
};

/// Step of the force of one class of bolts, as a logarithm: about as far as friction scatters.
const STEP: f64 = 0.25;

/// Slopes of the readings along the force of every class of bolts.
///
/// ```text
/// r(F) ≈ r(λ) + Σ_c s_c φ_c,   λ = ln ΣF/ΣF₀,   φ_c = mean_c ln F/F₀ − λ,   s_c = ∂r/∂ln F_c
/// ```
///
/// The sum of all forces is the variable of the response; this is what the pattern adds, to first
/// order. Its error is found on solved patterns.
/// Checked: `slopes_follow_a_pattern_of_known_answer`.
#[derive(Clone, Debug)]
pub(super) struct Pattern {
    nominal: Vec<f64>,
    classes: Vec<Vec<usize>>,
    slopes: Vec<Readings>,
}

impl Pattern {
    /// Slopes by central differences; a single class has no pattern and asks for no solution.
    pub(super) fn through<E>(
        nominal: &[f64],
        mut classes: Vec<Vec<usize>>,
        solve: impl Fn(Vec<f64>) -> Result<Path, E>,
    ) -> Result<Self, E> {
        if classes.len() < 2 {
            classes.clear();
        }
        let mut slopes = Vec::with_capacity(classes.len());
        for class in &classes {
            let stepped = |step: f64| {
                let mut forces = nominal.to_vec();
                for bolt in class {
                    forces[*bolt] *= step.exp();
                }
                solve(forces).map(|path| readings(&path))
            };
            let (less, more) = (stepped(-STEP)?, stepped(STEP)?);
            slopes.push(std::array::from_fn(|reading| {
                (more[reading] - less[reading]) / (2.0 * STEP)
            }));
        }
        Ok(Self {
            nominal: nominal.to_vec(),
            classes,
            slopes,
        })
    }

    /// Whether all bolts move together.
    pub(super) fn is_common(&self) -> bool {
        self.classes.is_empty()
    }

    /// What forces, N, add to the readings beyond their sum.
    pub(super) fn shift(&self, forces: &[f64]) -> Readings {
        let mut shift = [0.0; 7];
        let whole = forces.iter().sum::<f64>() / self.nominal.iter().sum::<f64>();
        if self.is_common() || whole <= 0.0 {
            return shift;
        }
        for (class, slopes) in self.classes.iter().zip(&self.slopes) {
            let logarithms = class
                .iter()
                .map(|bolt| (forces[*bolt] / self.nominal[*bolt]).max(LEAST_FORCE).ln());
            let off = logarithms.sum::<f64>() / class.len() as f64 - whole.max(LEAST_FORCE).ln();
            for (sum, slope) in shift.iter_mut().zip(slopes) {
                *sum += slope * off;
            }
        }
        shift
    }

    /// Forces with every other class half way from nominal to its least and the rest to its most.
    pub(super) fn alternating(&self, ends: &[Vec<f64>; 2]) -> Vec<f64> {
        let mut forces = self.nominal.clone();
        for (index, class) in self.classes.iter().enumerate() {
            for bolt in class {
                forces[*bolt] = (self.nominal[*bolt] * ends[index % 2][*bolt]).sqrt();
            }
        }
        forces
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Three bolts in parallel to one another, the joint's part in series with 1 K/W.
    fn path(forces: &[f64]) -> Path {
        let contact = forces.iter().sum::<f64>();
        let added = contact.recip();
        Path {
            contact,
            contact_per_bolt: forces.to_vec(),
            node_to_node: added,
            added_by_joint: added,
            source_to_sink: 1.0 + added,
            perfect_contact: 1.0,
            hottest: 1.0 + added,
            interface_drop: added,
            coolant_drop: None,
            resistance_lower: 0.0,
            resistance_upper: None,
        }
    }

    #[test]
    fn slopes_follow_a_pattern_of_known_answer() {
        let nominal = [1.0, 2.0, 5.0];
        let classes = vec![vec![0], vec![1], vec![2]];
        let solve = |forces: Vec<f64>| Ok::<Path, ()>(path(&forces));
        let pattern = Pattern::through(&nominal, classes, solve).expect("a pattern");
        // ln contact is the logarithm of the sum: its slopes are the shares 1/8, 2/8, 5/8. A central
        // difference over ±0.25 errs by 0.25²/6 of the third derivative, below 0.2 % here.
        for (slopes, share) in pattern.slopes.iter().zip([0.125, 0.25, 0.625]) {
            assert!((slopes[0] / share - 1.0).abs() < 0.01, "{slopes:?}");
        }
        // Forces that keep their sum move the sum of conductances by nothing; the linear pattern
        // says so within second order, half the variance of ln F.
        let moved = pattern.shift(&[1.1, 2.1, 4.8]);
        assert!(moved[0].abs() < 3e-3, "{moved:?}");
        // All alike is no pattern.
        let alike = pattern.shift(&[1.3, 2.6, 6.5]);
        assert!(alike.iter().all(|each| each.abs() < 1e-12), "{alike:?}");
    }
}
