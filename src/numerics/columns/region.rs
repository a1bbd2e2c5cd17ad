//! Parts of the plane, sampled on every cell of a plan.

use rayon::prelude::*;

use crate::numerics::columns::{Mirror, Plan};

/// Samples along one side of a cell.
const SIDE: usize = 16;
/// Words of a cell's samples; one word holds four lines of samples.
const WORDS: usize = SIDE * SIDE / 64;

/// A circular disc.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Disc {
    /// Centre.
    pub centre: [f64; 2],
    /// Radius.
    pub radius: f64,
}

/// Which of the 16 × 16 midpoints of every cell belong to a part of the plane.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Region {
    cells: Vec<[u64; WORDS]>,
}

impl Region {
    /// Nothing.
    pub fn empty(plan: &Plan) -> Self {
        Self {
            cells: vec![[0; WORDS]; plan.cells()],
        }
    }

    /// The points for which `inside` holds.
    pub fn sample(plan: &Plan, inside: &(dyn Fn([f64; 2]) -> bool + Sync)) -> Self {
        let cells = (0..plan.cells())
            .into_par_iter()
            .with_min_len(64)
            .map(|cell| sampled(plan, cell, inside))
            .collect();
        Self { cells }
    }

    /// The points inside any of the discs.
    pub fn discs(plan: &Plan, discs: &[Disc]) -> Self {
        let mut region = Self::empty(plan);
        for disc in discs {
            let reach = |lines: &[f64], middle: f64| {
                let first = lines.partition_point(|line| *line < middle - disc.radius);
                let last = lines.partition_point(|line| *line <= middle + disc.radius);
                first.saturating_sub(1)..last.min(lines.len() - 1)
            };
            let [x, y] = disc.centre;
            for i in reach(&plan.x, x) {
                for j in reach(&plan.y, y) {
                    let cell = i * (plan.y.len() - 1) + j;
                    let inside = |[px, py]: [f64; 2]| {
                        (px - x).powi(2) + (py - y).powi(2) < disc.radius.powi(2)
                    };
                    let found = sampled(plan, cell, &inside);
                    for (word, more) in region.cells[cell].iter_mut().zip(found) {
                        *word |= more;
                    }
                }
            }
        }
        region
    }

    /// What lies in both.
    #[must_use]
    pub fn and(&self, other: &Self) -> Self {
        self.combined(other, |a, b| a & b)
    }

    /// What lies in either.
    #[must_use]
    pub fn or(&self, other: &Self) -> Self {
        self.combined(other, |a, b| a | b)
    }

    /// What lies in this one alone.
    #[must_use]
    pub fn without(&self, other: &Self) -> Self {
        self.combined(other, |a, b| a & !b)
    }

    /// Its cells in the part of a plan that stands for the whole.
    #[must_use]
    pub fn part(&self, mirror: &Mirror) -> Self {
        let cells = 0..mirror.part().cells();
        Self {
            cells: cells
                .map(|cell| self.cells[mirror.original_cell(cell)])
                .collect(),
        }
    }

    fn combined(&self, other: &Self, rule: impl Fn(u64, u64) -> u64) -> Self {
        let cells = self.cells.iter().zip(&other.cells);
        Self {
            cells: cells
                .map(|(a, b)| std::array::from_fn(|word| rule(a[word], b[word])))
                .collect(),
        }
    }

    /// Share of every cell that belongs to it, 0 to 1.
    pub fn shares(&self) -> Vec<f64> {
        self.cells
            .iter()
            .map(|cell| count(cell) as f64 / (SIDE * SIDE) as f64)
            .collect()
    }

    /// Whether it holds nothing.
    pub fn is_empty(&self) -> bool {
        self.cells.iter().all(|cell| count(cell) == 0)
    }

    /// Area.
    pub fn area(&self, plan: &Plan) -> f64 {
        let shares = self.shares();
        (0..plan.cells())
            .map(|cell| shares[cell] * plan.cell_area(cell))
            .sum()
    }

    /// Integral of every column's bilinear function over it.
    pub fn weights(&self, plan: &Plan) -> Vec<f64> {
        let mut weights = vec![0.0; plan.columns()];
        for (cell, mask) in self.cells.iter().enumerate() {
            let Some(parts) = corner_parts(mask) else {
                continue;
            };
            let area = plan.cell_area(cell);
            for (column, part) in plan.corners(cell).into_iter().zip(parts) {
                weights[column] += area * part;
            }
        }
        weights
    }

    /// Integrals of the products of two corner functions of a cell over it; the corners as in
    /// [`Plan::corners`].
    pub fn masses(&self, plan: &Plan, cell: usize) -> [[f64; 4]; 4] {
        /// Two, one or no lines of a cell shared by two corners.
        const WHOLE: [[f64; 4]; 4] = [
            [4.0, 2.0, 2.0, 1.0],
            [2.0, 4.0, 1.0, 2.0],
            [2.0, 1.0, 4.0, 2.0],
            [1.0, 2.0, 2.0, 4.0],
        ];
        let area = plan.cell_area(cell);
        if count(&self.cells[cell]) as usize == SIDE * SIDE {
            return WHOLE.map(|row| row.map(|part| part / 36.0 * area));
        }
        let [x, y] = plan.cell_sides(cell);
        let along = |[low, high]: [f64; 2], at: f64| (at - low) / (high - low);
        let mut masses = [[0.0; 4]; 4];
        self.each_sample(plan, cell, |place, area| {
            let (s, t) = (along(x, place[0]), along(y, place[1]));
            let at = [(1.0 - s) * (1.0 - t), (1.0 - s) * t, s * (1.0 - t), s * t];
            for (row, one) in masses.iter_mut().zip(at) {
                for (mass, other) in row.iter_mut().zip(at) {
                    *mass += one * other * area;
                }
            }
        });
        masses
    }

    /// Integral of every column's bilinear function over the whole of the cells it reaches into.
    pub fn full_weights(&self, plan: &Plan) -> Vec<f64> {
        let mut weights = vec![0.0; plan.columns()];
        for (cell, mask) in self.cells.iter().enumerate() {
            if count(mask) > 0 {
                for column in plan.corners(cell) {
                    weights[column] += 0.25 * plan.cell_area(cell);
                }
            }
        }
        weights
    }

    /// Whether the sample nearest to a point belongs to it; false off the plan.
    pub fn holds(&self, plan: &Plan, point: [f64; 2]) -> bool {
        plan.cell_at(point).is_some_and(|cell| {
            let [x, y] = plan.cell_sides(cell);
            let along = |[low, high]: [f64; 2], at: f64| {
                let part = (at - low) / (high - low) * SIDE as f64;
                (part as usize).min(SIDE - 1)
            };
            bit(&self.cells[cell], along(x, point[0]), along(y, point[1]))
        })
    }

    /// Calls `visit` with the place and the area of every sample of one cell that belongs to it.
    pub fn each_sample(&self, plan: &Plan, cell: usize, mut visit: impl FnMut([f64; 2], f64)) {
        let [x, y] = plan.cell_sides(cell);
        let area = plan.cell_area(cell) / (SIDE * SIDE) as f64;
        for s in 0..SIDE {
            for t in 0..SIDE {
                if bit(&self.cells[cell], s, t) {
                    visit([middle(x, s), middle(y, t)], area);
                }
            }
        }
    }
}

fn middle([low, high]: [f64; 2], sample: usize) -> f64 {
    low + (high - low) * (sample as f64 + 0.5) / SIDE as f64
}

fn bit(mask: &[u64; WORDS], s: usize, t: usize) -> bool {
    let at = s * SIDE + t;
    mask[at / 64] >> (at % 64) & 1 == 1
}

fn count(mask: &[u64; WORDS]) -> u32 {
    mask.iter().map(|word| word.count_ones()).sum()
}

fn sampled(plan: &Plan, cell: usize, inside: &(dyn Fn([f64; 2]) -> bool + Sync)) -> [u64; WORDS] {
    let [x, y] = plan.cell_sides(cell);
    let mut mask = [0; WORDS];
    for s in 0..SIDE {
        for t in 0..SIDE {
            if inside([middle(x, s), middle(y, t)]) {
                let at = s * SIDE + t;
                mask[at / 64] |= 1 << (at % 64);
            }
        }
    }
    mask
}

/// Mean of the four corner functions over the samples of one cell, over all its samples.
fn corner_parts(mask: &[u64; WORDS]) -> Option<[f64; 4]> {
    match count(mask) {
        0 => return None,
        256 => return Some([0.25; 4]),
        _ => {}
    }
    let mut parts = [0.0; 4];
    for s in 0..SIDE {
        let along = (s as f64 + 0.5) / SIDE as f64;
        let (mut number, mut moment) = (0.0, 0.0);
        for t in 0..SIDE {
            if bit(mask, s, t) {
                number += 1.0;
                moment += (t as f64 + 0.5) / SIDE as f64;
            }
        }
        parts[0] += (1.0 - along) * (number - moment);
        parts[1] += (1.0 - along) * moment;
        parts[2] += along * (number - moment);
        parts[3] += along * moment;
    }
    Some(parts.map(|part| part / (SIDE * SIDE) as f64))
}
