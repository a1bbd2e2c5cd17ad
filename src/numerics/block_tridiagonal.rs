//! Two coupled chains: symmetric positive definite systems of 2 × 2 blocks in three diagonals.

/// Smallest pivot, relative to the diagonal entry it comes from, that still counts as positive.
///
/// Rounding leaves about 1e-16 of a diagonal entry in place of an exact zero.
const SMALLEST_PIVOT: f64 = 1e-14;

/// Two chains of equal length, joined rung by rung.
///
/// ```text
/// | a_j  b_j |  on the diagonal,   | −g1_j    0   |  between rung j and rung j + 1
/// | b_j  d_j |                     |   0    −g2_j |
/// ```
#[derive(Clone, Debug, PartialEq)]
pub struct Ladder {
    /// Diagonal blocks, each as `[a, b, d]`.
    pub rungs: Vec<[f64; 3]>,
    /// Links of the two chains between neighbouring rungs, one fewer than rungs; given positive.
    pub links: Vec<[f64; 2]>,
}

impl Ladder {
    /// A ladder whose blocks are all zero.
    pub fn new(rungs: usize) -> Self {
        Self {
            rungs: vec![[0.0; 3]; rungs],
            links: vec![[0.0; 2]; rungs.saturating_sub(1)],
        }
    }

    /// Puts a conductor between neighbouring rungs of one chain, on the diagonal too.
    pub fn link(&mut self, rung: usize, chain: usize, conductance: f64) {
        self.links[rung][chain] += conductance;
        self.rungs[rung][2 * chain] += conductance;
        self.rungs[rung + 1][2 * chain] += conductance;
    }

    /// The solution for one right-hand side; none when the matrix is not positive definite.
    ///
    /// Block elimination from the first rung to the last and back: exact up to rounding, in time
    /// proportional to the number of rungs.
    pub fn solution(mut self, mut load: Vec<[f64; 2]>) -> Option<Vec<[f64; 2]>> {
        let count = self.rungs.len();
        for rung in 0..count {
            let untouched = self.rungs[rung];
            if rung > 0 {
                let inverse = self.rungs[rung - 1];
                let [g1, g2] = self.links[rung - 1];
                let [x1, x2] = load[rung - 1];
                let block = &mut self.rungs[rung];
                block[0] -= g1 * g1 * inverse[0];
                block[1] -= g1 * g2 * inverse[1];
                block[2] -= g2 * g2 * inverse[2];
                load[rung][0] += g1 * x1;
                load[rung][1] += g2 * x2;
            }
            let inverse = inverse(self.rungs[rung], untouched)?;
            self.rungs[rung] = inverse;
            load[rung] = product(inverse, load[rung]);
        }
        for rung in (0..count.saturating_sub(1)).rev() {
            let [g1, g2] = self.links[rung];
            let [x1, x2] = load[rung + 1];
            let correction = product(self.rungs[rung], [g1 * x1, g2 * x2]);
            load[rung][0] += correction[0];
            load[rung][1] += correction[1];
        }
        Some(load)
    }
}

/// Inverse of a positive definite block; none when a pivot has vanished against its origin.
fn inverse([a, b, d]: [f64; 3], origin: [f64; 3]) -> Option<[f64; 3]> {
    if a.is_nan() || a <= SMALLEST_PIVOT * origin[0] {
        return None;
    }
    let pivot = d - b * b / a;
    if pivot.is_nan() || pivot <= SMALLEST_PIVOT * origin[2] {
        return None;
    }
    let determinant = a * pivot;
    Some([d / determinant, -b / determinant, a / determinant])
}

fn product([a, b, d]: [f64; 3], [x, y]: [f64; 2]) -> [f64; 2] {
    [a * x + b * y, b * x + d * y]
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ladder() -> Ladder {
        let mut ladder = Ladder::new(5);
        for rung in 0..5 {
            let step = rung as f64;
            ladder.rungs[rung] = [1.0 + 0.1 * step, -0.7, 0.9 + 0.2 * step];
        }
        for rung in 0..4 {
            ladder.link(rung, 0, 2.0 + rung as f64);
            ladder.link(rung, 1, 0.5);
        }
        ladder
    }

    #[test]
    fn solution_returns_its_right_hand_side() {
        let load: Vec<[f64; 2]> = (0..5).map(|j| [f64::from(j) - 1.5, 0.3]).collect();
        let matrix = ladder();
        let x = matrix.clone().solution(load.clone()).unwrap();
        for j in 0..5 {
            let [a, b, d] = matrix.rungs[j];
            let mut row = [a * x[j][0] + b * x[j][1], b * x[j][0] + d * x[j][1]];
            for chain in 0..2 {
                if j > 0 {
                    row[chain] -= matrix.links[j - 1][chain] * x[j - 1][chain];
                }
                if j < 4 {
                    row[chain] -= matrix.links[j][chain] * x[j + 1][chain];
                }
                // Ten unknowns of order one: rounding only.
                assert!((row[chain] - load[j][chain]).abs() < 1e-13);
            }
        }
    }

    #[test]
    fn a_floating_chain_is_refused() {
        let mut floating = Ladder::new(6);
        // Links whose sums round: the last pivot is not exactly zero.
        for (rung, link) in [0.1, 0.7, 0.3, 1.9, 0.13].into_iter().enumerate() {
            floating.link(rung, 0, link);
            floating.link(rung, 1, link);
        }
        floating.rungs[0][2] += 1.0;
        assert_eq!(floating.solution(vec![[1.0, 0.0]; 6]), None);
    }
}
