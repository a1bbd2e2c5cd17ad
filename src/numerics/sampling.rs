//! Evenly spread random points, and quantiles of what they give.

mod directions;
mod tail;

pub use tail::{Missed, REACH, Tail};

use directions::{DIMENSIONS, JOE_KUO};

/// Bits of one coordinate that the sequence itself fixes.
const BITS: usize = 32;

/// The last of these bits.
const UNIT: f64 = 1.0 / 4_294_967_296.0;

/// A Sobol sequence with Owen scrambling.
///
/// Every coordinate of every point is uniform on (0, 1), and the points of any block of 2ᵏ fill
/// the cube evenly; another seed gives an independent randomisation of the same points, so that
/// the spread over several seeds measures the sampling error. The first 2ᵏ points from index 0 are a
/// net; any other number of points is as unbiased, with a somewhat larger error.
/// Beyond 64 dimensions the coordinates are independent pseudo-random numbers of the same seed.
///
/// Source: Sobol 1967 with the numbers of Joe & Kuo 2008; nested uniform scrambling of Owen 1995 by
/// the hash of Laine & Karras 2011 with the constants of Vegdahl 2021 (from memory), in which every
/// digit is flipped by a bit that depends on seed, dimension and all digits before it.
/// Checked: `unscrambled_points_are_those_of_scipy`, `scrambled_points_keep_the_net`,
/// `scrambled_error_falls_faster_than_one_over_n`, `flips_depend_on_the_digits_before_alone`.
#[derive(Clone, Debug)]
pub struct Sobol {
    dimensions: usize,
    /// Columns of the generating matrices, the first digit in the lowest bit: digit by digit, all
    /// dimensions of it side by side.
    columns: Vec<Vec<u32>>,
    seeds: Option<Vec<u64>>,
    seed: u64,
}

/// The points of a sequence one after the other.
#[derive(Clone, Debug)]
pub struct Walk<'a> {
    sobol: &'a Sobol,
    index: u32,
    /// Digits of the next point, the first in the lowest bit.
    digits: Vec<u32>,
}

impl Sobol {
    /// The scrambled sequence.
    pub fn new(dimensions: usize, seed: u64) -> Self {
        let seeds = (0..dimensions as u64)
            .map(|dimension| mixed(mixed(seed) ^ dimension.wrapping_mul(0x9E37_79B9_7F4A_7C15)))
            .collect();
        Self {
            seeds: Some(seeds),
            seed,
            ..Self::unscrambled(dimensions)
        }
    }

    /// One of many independent scramblings that belong to one seed.
    pub fn replicate(dimensions: usize, seed: u64, replicate: usize) -> Self {
        Self::new(
            dimensions,
            mixed(seed).wrapping_add(mixed(!(replicate as u64))),
        )
    }

    /// The sequence as Sobol left it: starts at the origin, point for point that of SciPy.
    pub fn unscrambled(dimensions: usize) -> Self {
        let own: Vec<[u32; BITS]> = (0..dimensions.min(DIMENSIONS)).map(columns).collect();
        let digit = |at: usize| own.iter().map(|each| each[at].reverse_bits()).collect();
        Self {
            dimensions,
            columns: (0..BITS).map(digit).collect(),
            seeds: None,
            seed: 0,
        }
    }

    /// Number of coordinates of a point.
    pub fn dimensions(&self) -> usize {
        self.dimensions
    }

    /// Writes the point of that index to `out`; any index at any time.
    ///
    /// Coordinates of a scrambled point lie strictly between 0 and 1.
    pub fn point(&self, index: u32, out: &mut [f64]) {
        self.walk(index).next_into(out);
    }

    /// The points from an index on; what `point` gives, sooner.
    pub fn walk(&self, index: u32) -> Walk<'_> {
        // The order of Gray's code, in which neighbouring points differ by one column.
        let mut rest = index ^ (index >> 1);
        let mut digits = vec![0; self.dimensions.min(DIMENSIONS)];
        while rest != 0 {
            flip(&mut digits, &self.columns[rest.trailing_zeros() as usize]);
            rest &= rest - 1;
        }
        Walk {
            sobol: self,
            index,
            digits,
        }
    }
}

impl Walk<'_> {
    /// Writes the next point to `out`.
    pub fn next_into(&mut self, out: &mut [f64]) {
        let own = self.digits.len().min(out.len());
        match &self.sobol.seeds {
            Some(seeds) => {
                let digits = self.digits.iter().zip(seeds);
                for (out, (digits, seed)) in out.iter_mut().zip(digits) {
                    *out = (f64::from(scrambled(*digits, *seed)) + 0.5) * UNIT;
                }
            }
            None => {
                for (out, digits) in out.iter_mut().zip(&self.digits) {
                    *out = f64::from(digits.reverse_bits()) * UNIT;
                }
            }
        }
        let beyond = out.iter_mut().enumerate().take(self.sobol.dimensions);
        for (dimension, out) in beyond.skip(own) {
            let seeds = self.sobol.seeds.as_ref();
            let seed = seeds.map_or(self.sobol.seed, |seeds| seeds[dimension]);
            let place = mixed(u64::from(self.index) ^ (dimension as u64) << 32);
            *out = unit(mixed(seed ^ place));
        }
        self.index = self.index.wrapping_add(1);
        let column = self.index.trailing_zeros() as usize;
        match self.sobol.columns.get(column) {
            Some(column) => flip(&mut self.digits, column),
            // Past the last point stands the first.
            None => self.digits.fill(0),
        }
    }
}

/// Adds a column of every dimension, digit by digit without carry.
fn flip(digits: &mut [u32], column: &[u32]) {
    for (digits, column) in digits.iter_mut().zip(column) {
        *digits ^= column;
    }
}

/// Quantile of a rising sample at probability `p`, straight between neighbouring values.
///
/// ```text
/// h = (n − 1) p,   q = x⌊h⌋ + (h − ⌊h⌋) (x⌊h⌋₊₁ − x⌊h⌋)
/// ```
///
/// Type 7 of Hyndman & Fan, the default of NumPy. `NaN` for an empty sample.
///
/// Checked: `quantile_is_that_of_numpy`.
pub fn quantile(sorted: &[f64], p: f64) -> f64 {
    let Some(last) = sorted.len().checked_sub(1) else {
        return f64::NAN;
    };
    let place = last as f64 * p.clamp(0.0, 1.0);
    let below = (place.floor() as usize).min(last);
    let above = (below + 1).min(last);
    sorted[below] + (place - below as f64) * (sorted[above] - sorted[below])
}

/// Columns of the generating matrix, the first digit in the highest bit.
fn columns(dimension: usize) -> [u32; BITS] {
    let mut columns = [0; BITS];
    let Some(&(polynomial, initial)) = dimension.checked_sub(1).and_then(|at| JOE_KUO.get(at))
    else {
        for (at, column) in columns.iter_mut().enumerate() {
            *column = 1 << (31 - at);
        }
        return columns;
    };
    let degree = initial.len();
    for (at, m) in initial.iter().enumerate() {
        columns[at] = m << (31 - at);
    }
    for at in degree..BITS {
        let mut column = columns[at - degree] ^ (columns[at - degree] >> degree);
        for term in 1..degree {
            if polynomial >> (degree - term) & 1 == 1 {
                column ^= columns[at - term];
            }
        }
        columns[at] = column;
    }
    columns
}

/// Flips every digit by a bit that depends on all digits before it.
///
/// Sums, and products with what is odd or even, carry from low bits to high ones alone: with the first
/// digit in the lowest bit, no digit knows those behind it.
fn scrambled(digits: u32, seed: u64) -> u32 {
    let (first, second) = (seed as u32, (seed >> 32) as u32);
    let mut x = digits;
    x ^= x.wrapping_mul(0x3D20_ADEA);
    x = x.wrapping_add(first);
    x = x.wrapping_mul(second | 1);
    x ^= x.wrapping_mul(0x0552_6C56);
    x ^= x.wrapping_mul(0x53A2_2864);
    x.reverse_bits()
}

/// A well mixed 64-bit number: the finaliser of Steele, Lea & Flood 2014 (`SplitMix`).
fn mixed(number: u64) -> u64 {
    let mut z = number.wrapping_add(0x9E37_79B9_7F4A_7C15);
    z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
    z ^ (z >> 31)
}

/// Uniform strictly between 0 and 1.
fn unit(number: u64) -> f64 {
    ((number >> 12) as f64 + 0.5) * 2f64.powi(-52)
}

#[cfg(test)]
#[expect(clippy::float_cmp, reason = "these results are exact")]
mod tests {
    use super::*;

    #[test]
    fn unscrambled_points_are_those_of_scipy() {
        let table = include_str!("../../tests/data/sobol_unscrambled.csv");
        let sobol = Sobol::unscrambled(DIMENSIONS);
        let mut point = [0.0; DIMENSIONS];
        let mut rows = 0;
        for line in table.lines().filter(|line| !line.starts_with('#')) {
            let mut numbers = line.split(',').map(|number| number.parse::<u32>().unwrap());
            sobol.point(numbers.next().unwrap(), &mut point);
            for (dimension, (found, wanted)) in point.iter().zip(numbers.by_ref()).enumerate() {
                assert_eq!(
                    (found * 2f64.powi(32)) as u32,
                    wanted,
                    "dimension {dimension}"
                );
            }
            rows += 1;
        }
        assert_eq!(rows, 13);
    }

    /// In every dimension each of 256 equal cells holds exactly one of the first 256 points, and
    /// in every pair among the first dimensions each cell of a 2 × 128 or 16 × 16 grid that the
    /// unscrambled points fill evenly stays filled evenly.
    #[test]
    fn scrambled_points_keep_the_net() {
        let points = |sobol: &Sobol| -> Vec<Vec<f64>> {
            (0..256)
                .map(|index| {
                    let mut point = vec![0.0; sobol.dimensions()];
                    sobol.point(index, &mut point);
                    point
                })
                .collect()
        };
        let scrambled = points(&Sobol::new(DIMENSIONS, 7));
        let plain = points(&Sobol::unscrambled(DIMENSIONS));
        let occupied = |points: &[Vec<f64>], a: usize, b: usize, split: f64| {
            let mut cells = vec![0; 256];
            for point in points {
                let (x, y) = (point[a] * split, point[b] * 256.0 / split);
                cells[x as usize * (256.0 / split) as usize + y as usize] += 1;
            }
            cells.sort_unstable();
            cells
        };
        for a in 0..DIMENSIONS {
            assert_eq!(occupied(&scrambled, a, a, 256.0), vec![1; 256], "{a}");
            for b in 0..8 {
                for split in [2.0, 16.0] {
                    let pair = [&scrambled, &plain].map(|set| occupied(set, a, b, split));
                    assert_eq!(pair[0], pair[1], "{a} {b}");
                }
            }
        }
    }

    /// Root-mean-square error over 32 seeds of the mean of a smooth product in six dimensions.
    fn rms_error(points: u32) -> f64 {
        let mut squares = 0.0;
        for seed in 0..32 {
            let sobol = Sobol::new(6, seed);
            let mut point = [0.0; 6];
            let mut sum = 0.0;
            for index in 0..points {
                sobol.point(index, &mut point);
                sum += point.iter().map(|u| 1.0 + 0.5 * (u - 0.5)).product::<f64>();
            }
            squares += (sum / f64::from(points) - 1.0).powi(2);
        }
        (squares / 32.0).sqrt()
    }

    // Plain random numbers would gain a factor 4 on sixteen times the points; scrambled Sobol
    // points of a smooth function gain up to 64. More than 16 is asked, 34 found.
    #[test]
    fn scrambled_error_falls_faster_than_one_over_n() {
        let (few, many) = (rms_error(64), rms_error(1024));
        assert!(few / many > 16.0, "{few:e} {many:e}");
    }

    #[test]
    fn seeds_differ_and_repeat() {
        let point = |seed| {
            let mut point = [0.0; 80];
            Sobol::new(80, seed).point(5, &mut point);
            point
        };
        assert_eq!(point(1), point(1));
        for (a, b) in point(1).iter().zip(point(2)) {
            assert_ne!(*a, b);
            assert!(0.0 < *a && *a < 1.0);
        }
    }

    // Six standard errors of 4096 fair coins; of the 496 pairs of levels none may be further off.
    #[test]
    fn flips_of_different_levels_are_independent() {
        for digits in [0, u32::MAX, 0x9A3C_51E7_u32] {
            let mut agreements = [[0i32; BITS]; BITS];
            for seed in 0..4096 {
                let flips = scrambled(digits.reverse_bits(), mixed(seed)) ^ digits;
                for (a, row) in agreements.iter_mut().enumerate() {
                    for (b, count) in row.iter_mut().enumerate() {
                        *count += i32::from(flips >> a & 1 == flips >> b & 1);
                    }
                }
            }
            for (a, row) in agreements.iter().enumerate() {
                for (b, count) in row.iter().enumerate().filter(|(b, _)| *b != a) {
                    assert!((count - 2048).abs() < 6 * 32, "{a} {b}: {count}");
                }
            }
        }
    }

    // What makes a scrambling nested: points that share their first digits share their first flips,
    // and the flip of a digit does not depend on the digit itself or on any behind it.
    #[test]
    fn flips_depend_on_the_digits_before_alone() {
        for trial in 0..2000_u64 {
            let [seed, digits, other] = [1, 2, 3].map(|k| mixed(3 * trial + k));
            let shared = (trial % 32) as u32;
            let behind = (u64::from(u32::MAX) >> shared) as u32;
            let one = digits as u32;
            let two = (one & !behind) | (other as u32 & behind);
            let flips = [one, two].map(|digits| scrambled(digits.reverse_bits(), seed) ^ digits);
            // The digits that are shared, and the first that is not.
            let alike = !(behind >> 1);
            assert_eq!(flips[0] & alike, flips[1] & alike, "{shared}");
        }
    }

    #[test]
    fn a_walk_meets_every_point() {
        let sobol = Sobol::new(70, 5);
        for start in [0, 1, 77, 1 << 20, u32::MAX - 3] {
            let mut walk = sobol.walk(start);
            let (mut walked, mut alone) = ([0.0; 70], [0.0; 70]);
            for step in 0..40 {
                walk.next_into(&mut walked);
                sobol.point(start.wrapping_add(step), &mut alone);
                assert_eq!(walked, alone, "{start} {step}");
            }
        }
    }

    #[test]
    fn every_dimension_has_its_own_scrambling() {
        let mut origin = [0.0; DIMENSIONS];
        Sobol::new(DIMENSIONS, 11).point(0, &mut origin);
        origin.sort_by(f64::total_cmp);
        assert!(origin.windows(2).all(|pair| pair[0] < pair[1]));
    }

    // Each padding coordinate: mean ½ within four standard errors of 4096 uniform numbers.
    #[test]
    fn padding_is_uniform() {
        let sobol = Sobol::new(66, 3);
        let mut sums = [0.0; 3];
        let mut point = [0.0; 66];
        for index in 0..4096 {
            sobol.point(index, &mut point);
            sums[0] += point[64];
            sums[1] += point[65];
            sums[2] += (point[64] - 0.5) * (point[65] - 0.5);
        }
        assert!((sums[0] / 4096.0 - 0.5).abs() < 0.018);
        assert!((sums[1] / 4096.0 - 0.5).abs() < 0.018);
        assert!((sums[2] / 4096.0).abs() < 0.0052);
    }

    // From numpy.quantile([1, 2, 4, 8, 16], p).
    #[test]
    fn quantile_is_that_of_numpy() {
        let sample = [1.0, 2.0, 4.0, 8.0, 16.0];
        for (p, wanted) in [
            (0.0, 1.0),
            (0.05, 1.2),
            (0.5, 4.0),
            (0.9, 12.8),
            (1.0, 16.0),
        ] {
            assert!((quantile(&sample, p) - wanted).abs() < 1e-14, "{p}");
        }
        assert_eq!(quantile(&[3.0], 0.3), 3.0);
        assert!(quantile(&[], 0.5).is_nan());
    }
}
