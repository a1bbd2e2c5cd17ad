//! Fields over a range of force where faces are not flat, between fields that are solved.

use std::sync::Arc;

use crate::pressure::elastic::{FaceField, Failure, Field};

/// Most often that an interval is halved.
const DEEPEST: u32 = 5;

/// Solved fields at rising factors on the force, with everything between by interpolation.
///
/// With a bow or a measured map the contact grows with the force, so a field is no longer a
/// multiple of another. Between two solved fields pressure and gap of every column go straight:
///
/// ```text
/// p(s) = (1 − w) p(s₀) + w p(s₁),   g likewise,   w = (s − s₀)/(s₁ − s₀)
/// ```
///
/// so that the interpolated pressure carries exactly the interpolated force. Every interval is
/// solved once more in its middle, and halved until mean gap, mean force radius and
/// `∫ p^0.95 dA` there are met.
/// Checked: `a_table_over_force_errs_as_it_says` in `tests/validation_columns.rs`.
#[derive(Clone, Debug)]
pub struct Table {
    /// Factor on the force and the field, rising.
    nodes: Vec<(f64, Arc<Field>)>,
    /// Largest relative error found in the middle of an interval; the middles are nodes now, so
    /// what is left between nodes is smaller.
    pub error: f64,
}

impl Table {
    /// A table from one factor to a larger one, with errors below a tolerance where five halvings
    /// suffice; `error` tells what was reached.
    ///
    /// `solve` finds the field at a factor on the force.
    pub fn over(
        [low, high]: [f64; 2],
        tolerance: f64,
        solve: &dyn Fn(f64) -> Result<Arc<Field>, Failure>,
    ) -> Result<Self, Failure> {
        if !(0.0 < low && low < high && high.is_finite()) {
            return Err(Failure::Unsound {
                what: format!("a table of forces cannot run from {low} to {high}"),
            });
        }
        let mut table = Self {
            nodes: vec![(low, solve(low)?)],
            error: 0.0,
        };
        let last = (high, solve(high)?);
        table.fill(&last, DEEPEST, (tolerance, solve))?;
        Ok(table)
    }

    /// Adds the middle and the end of the interval from the last node to `end`.
    fn fill(
        &mut self,
        end: &(f64, Arc<Field>),
        depth: u32,
        (tolerance, solve): (f64, &dyn Fn(f64) -> Result<Arc<Field>, Failure>),
    ) -> Result<(), Failure> {
        let start = self.nodes[self.nodes.len() - 1].clone();
        let factor = (start.0 * end.0).sqrt();
        let middle = (factor, solve(factor)?);
        let guessed = between(&start, end, factor);
        let error = readings(&guessed)
            .into_iter()
            .zip(readings(&middle.1))
            .map(difference)
            .fold(0.0, f64::max);
        if error > tolerance && depth > 0 {
            self.fill(&middle, depth - 1, (tolerance, solve))?;
            return self.fill(end, depth - 1, (tolerance, solve));
        }
        self.error = self.error.max(error);
        self.nodes.push(middle);
        self.nodes.push(end.clone());
        Ok(())
    }

    /// Number of solved fields.
    pub fn len(&self) -> usize {
        self.nodes.len()
    }

    /// Whether there is none; never so for a table that was made.
    pub fn is_empty(&self) -> bool {
        self.nodes.is_empty()
    }

    /// Least and largest factor on the force.
    pub fn range(&self) -> [f64; 2] {
        [self.nodes[0].0, self.nodes[self.nodes.len() - 1].0]
    }

    /// The field at a factor on the force; none beyond the range.
    pub fn at(&self, factor: f64) -> Option<Arc<Field>> {
        let [low, high] = self.range();
        if !(low..=high).contains(&factor) {
            return None;
        }
        let right = self
            .nodes
            .partition_point(|node| node.0 < factor)
            .clamp(1, self.nodes.len() - 1);
        Some(Arc::new(between(
            &self.nodes[right - 1],
            &self.nodes[right],
            factor,
        )))
    }
}

/// What must be met in the middle of an interval: mean gap, mean force radius, `∫ p^0.95 dA`.
fn readings(field: &Field) -> [f64; 3] {
    let face = &field.faces[0];
    let sum: f64 = face
        .weight
        .iter()
        .zip(&face.pressure)
        .map(|(weight, pressure)| weight * pressure.powf(0.95))
        .sum();
    [field.gap_mean(), field.mean_force_radius(), sum]
}

/// Relative difference of two readings, both at least zero; none where both are zero.
fn difference((guessed, solved): (f64, f64)) -> f64 {
    let larger = guessed.max(solved);
    if larger > 0.0 {
        (guessed - solved).abs() / larger
    } else {
        0.0
    }
}

/// Straight between two fields of one grid.
fn between(
    (from, first): &(f64, Arc<Field>),
    (to, second): &(f64, Arc<Field>),
    factor: f64,
) -> Field {
    let share = (factor - from) / (to - from);
    let mix = |a: &[f64], b: &[f64]| -> Vec<f64> {
        a.iter().zip(b).map(|(a, b)| a + share * (b - a)).collect()
    };
    let mut field = first.as_ref().clone();
    for (face, other) in field.faces.iter_mut().zip(&second.faces) {
        *face = FaceField {
            pressure: mix(&face.pressure, &other.pressure),
            gap: mix(&face.gap, &other.gap),
            open_gap: mix(&face.open_gap, &other.open_gap),
            ..face.clone()
        };
    }
    for (bolt, other) in field.bolts.iter_mut().zip(&second.bolts) {
        bolt.force += share * (other.force - bolt.force);
    }
    field
}
