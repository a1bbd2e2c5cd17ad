//! How far to go along a step so that the energy falls.

use crate::{
    numerics::roots,
    pressure::elastic::{FaceFriction, newton::Search},
};

/// Rise of the energy, relative to its size, that counts as rounding or an unfinished solution.
const LEVEL: f64 = 1e-9;

impl Search<'_> {
    /// Energy of the bodies and their loads without contact, as a quadratic along a step: value at
    /// its start, slope there, curvature.
    fn smooth_energy(&self, before: &[f64]) -> [f64; 3] {
        let operator = &self.system.operator;
        let step: Vec<f64> = self
            .displacement
            .iter()
            .zip(before)
            .map(|(new, old)| new - old)
            .collect();
        let (mut image, mut step_image) = (operator.zeros(), operator.zeros());
        operator.product(before, &mut image);
        operator.product(&step, &mut step_image);
        let mut value =
            0.5 * operator.dot(before, &image) - operator.dot(&self.system.load, before);
        let mut slope = operator.dot(&step, &image) - operator.dot(&self.system.load, &step);
        let mut curvature = operator.dot(&step, &step_image);
        // The operator holds the ties of the touching columns; they are no part of the bodies.
        for (pairing, active) in self.system.pairings.iter().zip(&self.active) {
            for (column, _) in active.iter().enumerate().filter(|(_, active)| **active) {
                let strength = self.hardness * pairing.stiffness * pairing.weight[column];
                let apart =
                    |of: &[f64]| pairing.gap(operator, of, column) - pairing.opening[column];
                let (at, along) = (apart(before), apart(&step));
                value -= 0.5 * strength * at * at;
                slope -= strength * at * along;
                curvature -= strength * along * along;
            }
        }
        [value, slope, curvature]
    }

    /// Keeps a step that lowers the energy; shortens any other to where the energy is least along it.
    pub(super) fn descend(&mut self, before: &[f64]) {
        let sticks = self.problem.interfaces.iter();
        if sticks.clone().any(|one| one.faces == FaceFriction::Stuck) {
            // Ties that come and go with the contact leave no energy to compare.
            return;
        }
        let smooth = self.smooth_energy(before);
        let gaps = self.gaps(before);
        let energy = |part: f64| {
            smooth[0] + part * (smooth[1] + 0.5 * part * smooth[2]) + contact_energy(&gaps, part)
        };
        let (start, full) = (energy(0.0), energy(1.0));
        let size = start.abs().max(full.abs());
        let mut reached = full;
        if full > start + LEVEL * size {
            let part = least(|part| smooth[1] + part * smooth[2] + contact_slope(&gaps, part));
            reached = energy(part);
            for (new, old) in self.displacement.iter_mut().zip(before) {
                *new = old + part * (*new - old);
            }
            self.shortened += 1;
        }
        if self.energy.is_finite() && size > 0.0 {
            self.worst_rise = self.worst_rise.max((reached - start) / size);
        }
        self.energy = reached;
    }

    /// Strength, gap before and change of gap of every column of every pair.
    fn gaps(&self, before: &[f64]) -> Vec<[f64; 3]> {
        let operator = &self.system.operator;
        let mut gaps = Vec::new();
        for pairing in &self.system.pairings {
            for (column, weight) in pairing.weight.iter().enumerate() {
                if *weight > 0.0 {
                    let old = pairing.gap(operator, before, column);
                    let new = pairing.gap(operator, &self.displacement, column);
                    gaps.push([self.hardness * pairing.stiffness * weight, old, new - old]);
                }
            }
        }
        gaps
    }
}

fn contact_energy(gaps: &[[f64; 3]], part: f64) -> f64 {
    gaps.iter()
        .map(|[strength, gap, change]| 0.5 * strength * (gap + part * change).min(0.0).powi(2))
        .sum()
}

fn contact_slope(gaps: &[[f64; 3]], part: f64) -> f64 {
    gaps.iter()
        .map(|[strength, gap, change]| strength * change * (gap + part * change).min(0.0))
        .sum()
}

/// Where a rising slope passes zero between 0 and 1.
fn least(slope: impl Fn(f64) -> f64) -> f64 {
    roots::halved(|part| slope(part) < 0.0, 0.0, 1.0)
}
