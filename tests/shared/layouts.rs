//! Random layouts and their ranks, for the tests of the search and its bench.

use ringsum::layout::Constraints;

/// Ranks of values, smallest first.
fn ranks(values: &[f64]) -> Vec<f64> {
    let mut order: Vec<usize> = (0..values.len()).collect();
    order.sort_by(|one, other| values[*one].total_cmp(&values[*other]));
    let mut ranks = vec![0.0; values.len()];
    for (rank, index) in order.into_iter().enumerate() {
        ranks[index] = rank as f64;
    }
    ranks
}

/// Spearman's rank correlation, textbook form without ties.
pub fn spearman(one: &[f64], other: &[f64]) -> f64 {
    let count = one.len() as f64;
    let apart = ranks(one)
        .iter()
        .zip(ranks(other))
        .map(|(a, b)| (a - b).powi(2))
        .sum::<f64>();
    1.0 - 6.0 * apart / (count * (count * count - 1.0))
}

/// Random layouts of two to eight bolts that keep their distances, from a fixed seed.
pub fn random_layouts(
    constraints: &Constraints,
    size: [f64; 2],
    count: usize,
) -> Vec<Vec<[f64; 2]>> {
    let mut state = 12345_u64;
    let mut uniform = move || {
        // Linear congruence with Knuth's multiplier for 64 bits, from memory.
        state = state
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        (state >> 11) as f64 / (1_u64 << 53) as f64
    };
    let mut layouts = Vec::new();
    while layouts.len() < count {
        let bolts = 2 + (uniform() * 7.0) as usize;
        let places = (0..bolts).map(|_| size.map(|side| (side * uniform() * 1e6).round() * 1e-6));
        let places: Vec<[f64; 2]> = places.collect();
        if constraints.miss(&places) <= 0.0 {
            layouts.push(places);
        }
    }
    layouts
}
