//! How an answer goes with each input: correlations from sums that are added in a fixed order.

/// Sums over draws of the places of the inputs and the logarithm of an answer.
#[derive(Clone, Debug)]
pub(super) struct Shares {
    count: f64,
    /// Of each input: itself, its square, its product with the answer.
    inputs: Vec<[f64; 3]>,
    /// The answer and its square.
    answer: [f64; 2],
}

impl Shares {
    pub(super) fn of(inputs: usize) -> Self {
        Self {
            count: 0.0,
            inputs: vec![[0.0; 3]; inputs],
            answer: [0.0; 2],
        }
    }

    /// Takes a draw.
    pub(super) fn take(&mut self, readings: &[f64], answer: f64) {
        self.count += 1.0;
        for (sums, x) in self.inputs.iter_mut().zip(readings) {
            sums[0] += x;
            sums[1] += x * x;
            sums[2] += x * answer;
        }
        self.answer[0] += answer;
        self.answer[1] += answer * answer;
    }

    /// Adds the sums of further draws.
    pub(super) fn add(&mut self, other: &Self) {
        self.count += other.count;
        for (sums, more) in self.inputs.iter_mut().zip(&other.inputs) {
            for (sum, more) in sums.iter_mut().zip(more) {
                *sum += more;
            }
        }
        for (sum, more) in self.answer.iter_mut().zip(other.answer) {
            *sum += more;
        }
    }

    /// Share of the variance that goes with each input.
    ///
    /// ```text
    /// share = corr(x, y)²
    /// ```
    ///
    /// The first-order share where y is linear in the inputs; what is left to 1 is curvature and
    /// interaction. 0 where either side does not move or is not finite.
    pub(super) fn correlated(&self) -> Vec<f64> {
        let mean = self.answer[0] / self.count;
        let of_answer = self.answer[1] - self.count * mean * mean;
        self.inputs
            .iter()
            .map(|[sum, squares, products]| {
                let own = sum / self.count;
                let of_input = squares - self.count * own * own;
                let both = products - self.count * own * mean;
                let share = both * both / (of_input * of_answer);
                if share.is_finite() { share } else { 0.0 }
            })
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    // By hand: x = 0, 1, 2, 3 and y = 0, 1, 1, 4 have Σ(x − x̄)² = 5, Σ(y − ȳ)² = 9 and
    // Σ(x − x̄)(y − ȳ) = 6, so the share is 36/45; 1e-14 is rounding.
    #[test]
    fn shares_are_squares_of_the_correlation_however_they_are_added() {
        let draws = [(0.0, 0.0), (1.0, 1.0), (2.0, 1.0), (3.0, 4.0)];
        for split in 0..=4 {
            let mut parts = [Shares::of(2), Shares::of(2)];
            for (index, (x, y)) in draws.into_iter().enumerate() {
                parts[usize::from(index >= split)].take(&[x, 7.0], y);
            }
            let [mut all, more] = parts;
            all.add(&more);
            let shares = all.correlated();
            assert!((shares[0] - 0.8).abs() < 1e-14, "{split}: {shares:?}");
            assert!(shares[1].abs() < f64::EPSILON);
        }
    }
}
