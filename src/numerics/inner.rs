//! Inner products in running sums that the processor can carry side by side.

/// Inner product in so many running sums. How many there are decides the last digits.
#[inline]
pub(in crate::numerics) fn product<const LANES: usize>(a: &[f64], b: &[f64]) -> f64 {
    let (a_blocks, b_blocks) = (a.chunks_exact(LANES), b.chunks_exact(LANES));
    let rest: f64 = a_blocks
        .remainder()
        .iter()
        .zip(b_blocks.remainder())
        .map(|(x, y)| x * y)
        .sum();
    let mut sums = [0.0; LANES];
    for (x, y) in a_blocks.zip(b_blocks) {
        for (lane, sum) in sums.iter_mut().enumerate() {
            *sum += x[lane] * y[lane];
        }
    }
    sums.iter().sum::<f64>() + rest
}

#[cfg(test)]
mod tests {
    use super::*;

    // Whole numbers below 2⁵³ add up without rounding.
    #[test]
    fn every_length_is_summed_whole() {
        for length in 0..20_u32 {
            let a: Vec<f64> = (0..length).map(f64::from).collect();
            let wanted =
                f64::from(length) * (f64::from(length) - 1.0) * (2.0 * f64::from(length) - 1.0);
            for found in [product::<4>(&a, &a), product::<8>(&a, &a)] {
                assert!((6.0 * found - wanted).abs() < 0.5, "{length}: {found}");
            }
        }
    }
}
