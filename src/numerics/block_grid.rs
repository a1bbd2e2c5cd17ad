//! Two coupled sheets on a rectangular grid: symmetric positive definite systems of 2 × 2 blocks.

/// Shares of the dropped fill that are kept on the diagonal, tried in turn; 1 would keep row sums
/// exactly. Where blocks pull a row sum below zero a pivot may fall there with it.
const KEPT_FILL: [f64; 2] = [0.99, 0.0];
/// Rounds after which the solution is given up; a thousand by a thousand nodes need fewer.
const MOST_ROUNDS: usize = 5000;
/// Square of the relative residual, in the preconditioned norm, at which the solution is done.
const DONE: f64 = 1e-16;

/// Why a system was given up.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stopped {
    /// Rounds done.
    pub rounds: usize,
    /// Residual left over the right-hand side, both in the preconditioned norm; not a number where
    /// the matrix is not positive definite.
    pub residual: f64,
}

/// Two sheets of nodes, joined node by node; node (i, j) has the index j · columns + i.
#[derive(Clone, Debug, PartialEq)]
pub struct Sheets {
    /// Nodes along a row.
    pub columns: usize,
    /// Diagonal blocks, each as `[a, b, d]`.
    pub blocks: Vec<[f64; 3]>,
    /// Links of both sheets to the next node along the row and to the one above; positive.
    pub links: Vec<[[f64; 2]; 2]>,
}

impl Sheets {
    /// Sheets whose blocks are all zero.
    pub fn new(columns: usize, rows: usize) -> Self {
        Self {
            columns,
            blocks: vec![[0.0; 3]; columns * rows],
            links: vec![[[0.0; 2]; 2]; columns * rows],
        }
    }

    /// Distance in index to the next node along the row, or to the one above.
    fn step(&self, axis: usize) -> usize {
        [1, self.columns][axis]
    }

    /// Puts a conductor between a node and its next one along an axis, on the diagonal too.
    pub fn link(&mut self, (node, axis): (usize, usize), sheet: usize, conductance: f64) {
        let next = node + self.step(axis);
        self.links[node][axis][sheet] += conductance;
        self.blocks[node][2 * sheet] += conductance;
        self.blocks[next][2 * sheet] += conductance;
    }

    /// The solution for one right-hand side by conjugate gradients with an incomplete block
    /// factor, or sweeps of Gauss and Seidel where there is none; given up when the matrix is not
    /// positive definite or the rounds run out.
    pub fn solution(&self, load: &[[f64; 2]]) -> Result<Vec<[f64; 2]>, Stopped> {
        let inverses = KEPT_FILL
            .into_iter()
            .find_map(|kept| self.incomplete_factor(kept))
            .or_else(|| self.inverse_blocks())
            .ok_or(Stopped {
                rounds: 0,
                residual: f64::NAN,
            })?;
        let mut x = vec![[0.0; 2]; load.len()];
        let mut residual = load.to_vec();
        let mut turned = vec![[0.0; 2]; load.len()];
        self.precondition(&inverses, &residual, &mut turned);
        let mut direction = turned.clone();
        let mut image = vec![[0.0; 2]; load.len()];
        let mut norm = dot(&residual, &direction);
        let whole = norm;
        let stopped = |rounds: usize, norm: f64| Stopped {
            rounds,
            residual: (norm / whole).sqrt(),
        };
        for rounds in 0..MOST_ROUNDS {
            if norm <= DONE * whole {
                return Ok(x);
            }
            self.product(&direction, &mut image);
            let curvature = dot(&direction, &image);
            if curvature.is_nan() || curvature <= 0.0 {
                return Err(stopped(rounds, norm));
            }
            let length = norm / curvature;
            add(&mut x, length, &direction);
            add(&mut residual, -length, &image);
            self.precondition(&inverses, &residual, &mut turned);
            let next = dot(&residual, &turned);
            let keep = next / norm;
            norm = next;
            for (old, new) in direction.iter_mut().zip(&turned) {
                *old = [new[0] + keep * old[0], new[1] + keep * old[1]];
            }
        }
        Err(stopped(MOST_ROUNDS, norm))
    }

    /// The matrix times `x`, into `image`.
    fn product(&self, x: &[[f64; 2]], image: &mut [[f64; 2]]) {
        for ((image, block), x) in image.iter_mut().zip(&self.blocks).zip(x) {
            *image = times(*block, *x);
        }
        for (axis, step) in [1, self.columns].into_iter().enumerate() {
            // Each link takes from both of its ends; the two ends are `step` apart.
            for node in 0..x.len().saturating_sub(step) {
                let link = self.links[node][axis];
                let (here, there) = (x[node], x[node + step]);
                for sheet in 0..2 {
                    image[node][sheet] -= link[sheet] * there[sheet];
                    image[node + step][sheet] -= link[sheet] * here[sheet];
                }
            }
        }
    }

    /// Inverse pivots of a factor that keeps the pattern of the matrix; none where a pivot is not
    /// positive, as of a matrix that is positive definite but not dominated by its diagonal.
    fn incomplete_factor(&self, kept: f64) -> Option<Vec<[f64; 3]>> {
        let mut pivots = self.blocks.clone();
        for node in 0..pivots.len() {
            let inverse = inverse(pivots[node])?;
            pivots[node] = inverse;
            let links = self.links[node];
            for axis in 0..2 {
                let next = node + self.step(axis);
                if next >= pivots.len() {
                    continue;
                }
                let [g1, g2] = links[axis];
                let [f1, f2] = times(inverse, links[1 - axis]);
                let pivot = &mut pivots[next];
                pivot[0] -= g1 * (g1 * inverse[0] + kept * f1);
                pivot[1] -= g1 * g2 * inverse[1];
                pivot[2] -= g2 * (g2 * inverse[2] + kept * f2);
            }
        }
        Some(pivots)
    }

    /// The pivots of symmetric sweeps of Gauss and Seidel: positive wherever the blocks are.
    fn inverse_blocks(&self) -> Option<Vec<[f64; 3]>> {
        self.blocks.iter().map(|block| inverse(*block)).collect()
    }

    /// Forward and backward sweep of the incomplete factor, into `z`.
    fn precondition(&self, inverses: &[[f64; 3]], residual: &[[f64; 2]], z: &mut [[f64; 2]]) {
        let (count, columns) = (residual.len(), self.columns);
        z.copy_from_slice(residual);
        for node in 0..count {
            let solved = times(inverses[node], z[node]);
            z[node] = solved;
            let [along, up] = &self.links[node];
            if let Some(next) = z.get_mut(node + 1) {
                next[0] += along[0] * solved[0];
                next[1] += along[1] * solved[1];
            }
            if let Some(next) = z.get_mut(node + columns) {
                next[0] += up[0] * solved[0];
                next[1] += up[1] * solved[1];
            }
        }
        for node in (0..count).rev() {
            let [along, up] = &self.links[node];
            let next = z.get(node + 1).copied().unwrap_or_default();
            let above = z.get(node + columns).copied().unwrap_or_default();
            let pulled = [
                along[0] * next[0] + up[0] * above[0],
                along[1] * next[1] + up[1] * above[1],
            ];
            let correction = times(inverses[node], pulled);
            z[node][0] += correction[0];
            z[node][1] += correction[1];
        }
    }
}

/// The inverse of a block; none where the block is not positive definite.
fn inverse([a, b, d]: [f64; 3]) -> Option<[f64; 3]> {
    let determinant = a * d - b * b;
    (determinant > 0.0 && a > 0.0).then(|| [d / determinant, -b / determinant, a / determinant])
}

fn times([a, b, d]: [f64; 3], [x, y]: [f64; 2]) -> [f64; 2] {
    [a * x + b * y, b * x + d * y]
}

fn dot(x: &[[f64; 2]], y: &[[f64; 2]]) -> f64 {
    x.iter()
        .zip(y)
        .map(|(x, y)| x[0] * y[0] + x[1] * y[1])
        .sum()
}

fn add(x: &mut [[f64; 2]], factor: f64, y: &[[f64; 2]]) {
    for (x, y) in x.iter_mut().zip(y) {
        x[0] += factor * y[0];
        x[1] += factor * y[1];
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn solution_returns_its_right_hand_side() {
        let (columns, rows) = (23, 17);
        let mut sheets = Sheets::new(columns, rows);
        let uneven = |node: usize| 1.0 + 0.3 * ((node * node) % 7) as f64;
        for node in 0..columns * rows {
            sheets.blocks[node] = [0.02 * uneven(node), -0.01, 0.011 * uneven(node)];
        }
        for node in 0..columns * rows {
            for sheet in 0..2 {
                if node % columns + 1 < columns {
                    sheets.link((node, 0), sheet, uneven(node));
                }
                if node + columns < columns * rows {
                    sheets.link((node, 1), sheet, 2.0 / uneven(node));
                }
            }
        }
        let load: Vec<[f64; 2]> = (0..columns * rows)
            .map(|node| [(node % 5) as f64, 1.0 - (node % 3) as f64])
            .collect();
        let x = sheets.solution(&load).unwrap();
        let mut image = x.clone();
        sheets.product(&x, &mut image);
        for (found, wanted) in image.iter().zip(&load) {
            // The residual stops at 1e-8 of a right-hand side of order one.
            assert!((found[0] - wanted[0]).abs() < 1e-6);
            assert!((found[1] - wanted[1]).abs() < 1e-6);
        }
    }

    /// A plate far thicker than its cells are wide, on an isothermal back: half as much more flux comes
    /// from its mean temperature than goes into the other sheet's row, whose sum falls below zero.
    #[test]
    fn blocks_that_outweigh_their_rows_are_solved() {
        let (columns, rows) = (40, 30);
        let mut sheets = Sheets::new(columns, rows);
        for node in 0..columns * rows {
            let coupling = 0.3 * (1.0 + (node % 4) as f64);
            sheets.blocks[node] = [coupling, -1.5 * coupling, 2.25 * coupling + 0.05];
        }
        for node in 0..columns * rows {
            if node % columns + 1 < columns {
                sheets.link((node, 0), 0, 1.0);
                sheets.link((node, 0), 1, 6.0);
            }
            if node + columns < columns * rows {
                sheets.link((node, 1), 0, 1.0);
                sheets.link((node, 1), 1, 6.0);
            }
        }
        assert!(sheets.incomplete_factor(KEPT_FILL[0]).is_none());
        let load: Vec<[f64; 2]> = (0..columns * rows)
            .map(|node| [(node % 5) as f64, 0.0])
            .collect();
        let x = sheets.solution(&load).unwrap();
        let mut image = x.clone();
        sheets.product(&x, &mut image);
        for (found, wanted) in image.iter().zip(&load) {
            // The residual stops at 1e-8 in the preconditioned norm.
            let off = (0..2).map(|k| (found[k] - wanted[k]).abs());
            assert!(off.fold(0.0, f64::max) < 1e-6);
        }
    }

    #[test]
    fn a_floating_sheet_is_refused() {
        let sheets = Sheets::new(3, 1);
        let stopped = sheets.solution(&[[1.0, 0.0]; 3]).unwrap_err();
        assert!(stopped.rounds == 0 && stopped.residual.is_nan());
    }

    #[test]
    fn a_right_hand_side_that_is_no_number_is_refused() {
        let mut sheets = Sheets::new(2, 1);
        sheets.blocks = vec![[1.0, 0.0, 1.0]; 2];
        assert!(sheets.solution(&[[f64::NAN, 0.0]; 2]).is_err());
        assert!(sheets.solution(&[[f64::INFINITY, 0.0]; 2]).is_err());
    }
}
