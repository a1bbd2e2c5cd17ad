//! Plans that mirror about a line: one part of them stands for the whole.

use crate::numerics::columns::{
    Conductor, Operator, Plan, Scalar,
    kernel::{Coupling, Matrix},
};

/// Lines that miss their mirror image by this share of the plan still mirror: rounding.
const SAME: f64 = 1e-12;

/// A plan with the part of it that stands for the whole: the lower half along every mirrored axis,
/// the line of the mirror included.
#[derive(Clone, Debug, PartialEq)]
pub struct Mirror {
    whole: Plan,
    part: Plan,
    /// Whether x mirrors, whether y does.
    across: [bool; 2],
}

impl Mirror {
    /// The mirror of a plan along those of the wanted axes whose lines mirror about one of them; none
    /// where no axis is left.
    pub fn of(plan: &Plan, wanted: [bool; 2]) -> Option<Self> {
        let across = [wanted[0] && mirrors(&plan.x), wanted[1] && mirrors(&plan.y)];
        let half = |lines: &[f64], halved: bool| {
            let kept = if halved {
                lines.len() / 2 + 1
            } else {
                lines.len()
            };
            lines[..kept].to_vec()
        };
        across.contains(&true).then(|| Self {
            part: Plan::new(half(&plan.x, across[0]), half(&plan.y, across[1])),
            whole: plan.clone(),
            across,
        })
    }

    /// The whole plan.
    pub fn whole(&self) -> &Plan {
        &self.whole
    }

    /// The part that stands for it.
    pub fn part(&self) -> &Plan {
        &self.part
    }

    /// Whether x mirrors, whether y does.
    pub fn across(&self) -> [bool; 2] {
        self.across
    }

    /// Number of parts that make the whole: 2 or 4.
    pub fn parts(&self) -> usize {
        self.across
            .iter()
            .map(|halved| 1 + usize::from(*halved))
            .product()
    }

    /// Column of the part that is the image of one of the whole, and along which axes it was
    /// reflected.
    pub fn image(&self, column: usize) -> (usize, [bool; 2]) {
        let rows = self.whole.y.len();
        let at = [column / rows, column % rows];
        let counts = [self.whole.x.len(), rows];
        let beyond = [0, 1].map(|axis| self.across[axis] && 2 * at[axis] + 1 > counts[axis]);
        let [i, j] = [0, 1].map(|axis| {
            if beyond[axis] {
                counts[axis] - 1 - at[axis]
            } else {
                at[axis]
            }
        });
        (self.part.column(i, j), beyond)
    }

    /// Column of the whole at the place of one of the part.
    pub fn original(&self, column: usize) -> usize {
        let rows = self.part.y.len();
        self.whole.column(column / rows, column % rows)
    }

    /// Cell of the whole at the place of one of the part.
    pub fn original_cell(&self, cell: usize) -> usize {
        let rows = self.part.y.len() - 1;
        cell / rows * (self.whole.y.len() - 1) + cell % rows
    }

    /// Cell of the part that is the image of one of the whole.
    pub fn image_cell(&self, cell: usize) -> usize {
        let counts = [self.whole.x.len() - 1, self.whole.y.len() - 1];
        let at = [cell / counts[1], cell % counts[1]];
        let [i, j] = [0, 1].map(|axis| {
            if self.across[axis] {
                at[axis].min(counts[axis] - 1 - at[axis])
            } else {
                at[axis]
            }
        });
        i * (self.part.y.len() - 1) + j
    }

    /// Share of a column's surroundings that lies in the part, times the number of parts over that of
    /// its images: 1 inside, a half on a line of the mirror, a quarter where two cross.
    fn weight(&self, column: usize) -> f64 {
        let rows = self.part.y.len();
        let last = [self.part.x.len() - 1, rows - 1];
        let at = [column / rows, column % rows];
        let on = |axis: usize| self.across[axis] && at[axis] == last[axis];
        [0, 1]
            .map(|axis| if on(axis) { 0.5 } else { 1.0 })
            .iter()
            .product()
    }

    /// Values of the part's columns at all columns of the whole.
    pub fn spread<T: Clone>(&self, values: &[T]) -> Vec<T> {
        (0..self.whole.columns())
            .map(|column| values[self.image(column).0].clone())
            .collect()
    }

    /// Values of the whole's columns at those of the part.
    pub fn kept<T: Clone>(&self, values: &[T]) -> Vec<T> {
        (0..self.part.columns())
            .map(|column| values[self.original(column)].clone())
            .collect()
    }

    /// A vector of so many unknowns for each column, spread over the whole.
    pub fn spread_vector(&self, part: &[f64], stride: usize) -> Vec<f64> {
        let mut whole = Vec::with_capacity(self.whole.columns() * stride);
        for column in 0..self.whole.columns() {
            let from = self.image(column).0 * stride;
            whole.extend_from_slice(&part[from..from + stride]);
        }
        whole
    }

    /// A vector of so many unknowns for each column, at the columns of the part.
    pub fn kept_vector(&self, whole: &[f64], stride: usize) -> Vec<f64> {
        let mut part = Vec::with_capacity(self.part.columns() * stride);
        for column in 0..self.part.columns() {
            let from = self.original(column) * stride;
            part.extend_from_slice(&whole[from..from + stride]);
        }
        part
    }

    /// Equations of the part for values that mirror, from those of the whole: `Pᵀ A P` over the number
    /// of parts, where `P` spreads values.
    ///
    /// Whether the equations mirror is for the caller to know, see [`Mirror::holds`].
    pub fn folded(&self, operator: &Operator<Scalar>) -> Operator<Scalar> {
        let matrix = &operator.matrix;
        let sets = matrix.sets.iter().map(|set| {
            let width = set.len() / (9 * self.whole.columns());
            self.folded_stencils(set, width)
        });
        let couplings = matrix.couplings.iter().map(|coupling| Coupling {
            plus: coupling.plus,
            minus: coupling.minus,
            stencil: self.folded_rows(&coupling.stencil),
        });
        let parts = self.parts() as f64;
        let conductors = operator.conductors.iter().map(|conductor| Conductor {
            entries: self.folded_entries(&conductor.entries, matrix.stride),
            strength: conductor.strength / parts,
        });
        Operator {
            matrix: Matrix {
                lines: [self.part.x.len(), self.part.y.len()],
                stride: matrix.stride,
                slabs: matrix.slabs.clone(),
                sets: sets.collect(),
                couplings: couplings.collect(),
                held: matrix.held.clone(),
                form: std::marker::PhantomData,
            },
            groups: operator.groups.clone(),
            conductors: conductors.collect(),
            plan: self.part.clone(),
        }
    }

    /// Takes the couplings of the whole over into equations that were folded before.
    pub fn refold(&self, operator: &Operator<Scalar>, folded: &mut Operator<Scalar>) {
        let couplings = folded.matrix.couplings.iter_mut();
        for (own, whole) in couplings.zip(&operator.matrix.couplings) {
            own.stencil = self.folded_rows(&whole.stencil);
        }
    }

    /// A right-hand side of the part from one of the whole.
    pub fn folded_load(&self, load: &[f64], stride: usize) -> Vec<f64> {
        let mut part = self.kept_vector(load, stride);
        for (column, values) in part.chunks_mut(stride).enumerate() {
            let weight = self.weight(column);
            for value in values {
                *value *= weight;
            }
        }
        part
    }

    /// Whether a vector over the whole mirrors within rounding, value by value: a few may be larger than
    /// all others by many powers of ten.
    fn is_even(&self, whole: &[f64], stride: usize) -> bool {
        /// Of a value, from some hundred terms of either sign; of the largest one.
        const ROUNDING: [f64; 2] = [1e-9, 1e-14];
        let largest = whole
            .iter()
            .fold(0.0_f64, |most, value| most.max(value.abs()));
        let same = |one: f64, two: f64| {
            (one - two).abs() <= ROUNDING[0] * one.abs().max(two.abs()) + ROUNDING[1] * largest
        };
        whole.chunks(stride).enumerate().all(|(column, values)| {
            let (image, reflected) = self.image(column);
            let other = self.original(image) * stride;
            reflected == [false; 2]
                || values
                    .iter()
                    .zip(&whole[other..other + stride])
                    .all(|(one, two)| same(*one, *two))
        })
    }

    /// Whether equations with their right-hand side mirror: the load does, and what the matrix makes of
    /// an arbitrary vector that does.
    ///
    /// A matrix for which one such vector mirrors by chance alone does not occur in practice: every
    /// entry meets a number of its own.
    pub fn holds(&self, operator: &Operator<Scalar>, load: &[f64]) -> bool {
        let stride = operator.matrix.stride;
        if !self.is_even(load, stride) {
            return false;
        }
        let arbitrary: Vec<f64> = (0..self.part.columns() * stride)
            .map(|at| (at as f64 * 0.618_033_988_749_895).fract() + 0.5)
            .collect();
        let mut image = operator.zeros();
        operator.product(&self.spread_vector(&arbitrary, stride), &mut image);
        self.is_even(&image, stride)
    }

    fn folded_rows(&self, rows: &[[f64; 9]]) -> Vec<[f64; 9]> {
        let folded = self.folded_stencils(rows.as_flattened(), 1);
        folded.as_chunks::<9>().0.to_vec()
    }

    fn folded_stencils(&self, whole: &[f64], width: usize) -> Vec<f64> {
        let rows = self.part.y.len();
        let last = [self.part.x.len() - 1, rows - 1];
        let mut part = vec![0.0; self.part.columns() * 9 * width];
        for (column, own) in part.chunks_mut(9 * width).enumerate() {
            let weight = self.weight(column);
            let at = [column / rows, column % rows];
            // A neighbour beyond the line of the mirror is the one before it.
            let turned = |axis: usize, step: usize| {
                if self.across[axis] && at[axis] == last[axis] && step == 2 {
                    0
                } else {
                    step
                }
            };
            let from = self.original(column) * 9 * width;
            for (neighbour, values) in whole[from..from + 9 * width].chunks(width).enumerate() {
                let into = 3 * turned(0, neighbour / 3) + turned(1, neighbour % 3);
                for (sum, value) in own[into * width..].iter_mut().zip(values) {
                    *sum += weight * value;
                }
            }
        }
        part
    }

    fn folded_entries(&self, entries: &[(usize, f64)], stride: usize) -> Vec<(usize, f64)> {
        let mut folded: Vec<(usize, f64)> = entries
            .iter()
            .map(|(at, value)| (self.image(at / stride).0 * stride + at % stride, *value))
            .collect();
        folded.sort_by_key(|(at, _)| *at);
        folded.dedup_by(|next, kept| {
            let same = next.0 == kept.0;
            if same {
                kept.1 += next.1;
            }
            same
        });
        folded
    }
}

/// Whether lines mirror about the one in their middle.
fn mirrors(lines: &[f64]) -> bool {
    let last = lines.len() - 1;
    let span = lines[last] - lines[0];
    last >= 2
        && last.is_multiple_of(2)
        && (0..=last)
            .all(|at| (lines[at] + lines[last - at] - lines[0] - lines[last]).abs() <= SAME * span)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numerics::{
        columns::{Layer, Tie, lumped, mass},
        multigrid::{Coarsening, Effort, Multigrid, conjugate_gradients},
    };

    fn plan() -> Plan {
        let lines = |half: &[f64]| {
            let last = half[half.len() - 1];
            let back = half.iter().rev().skip(1).map(|at| 2.0 * last - at);
            half.iter().copied().chain(back).collect()
        };
        Plan::new(
            lines(&[0.0, 0.3, 0.5, 0.6, 1.0]),
            lines(&[0.0, 0.2, 0.6, 0.7]),
        )
    }

    /// Two plates with a tie that leans by `lean`, a film and a bolt with its three images.
    fn operator(lean: f64) -> (Operator<Scalar>, Vec<f64>) {
        let plan = plan();
        let mut operator = Operator::<Scalar>::new(&plan, &[3, 2]);
        let shares: Vec<f64> = (0..plan.cells())
            .map(|cell| {
                let [x, y] = plan.cell_sides(cell);
                let middle = [0.5 * (x[0] + x[1]) - 1.0, 0.5 * (y[0] + y[1]) - 0.7];
                if middle[0].hypot(middle[1]) < 0.3 {
                    0.4
                } else {
                    1.0
                }
            })
            .collect();
        for (group, heights, degree) in [(0, [0.2], 2), (1, [0.1], 1)] {
            operator.add_layer(&Layer {
                shares: &shares,
                group,
                first_node: 0,
                heights: &heights,
                degree,
                constants: Scalar {
                    along: [2.0, 3.0],
                    through: 5.0,
                },
            });
        }
        let weights: Vec<f64> = (0..plan.columns())
            .map(|column| {
                let [x, y] = plan.place(column);
                1.0 + lean * x + (x - 1.0).powi(2) + (y - 0.7).powi(2)
            })
            .collect();
        operator.add_tie(Tie {
            plus: operator.unknown(0, 0, 0),
            minus: Some(operator.unknown(1, 0, 1)),
            stencil: lumped(&weights),
        });
        operator.add_tie(Tie {
            plus: operator.unknown(1, 0, 0),
            minus: None,
            stencil: mass(&plan, &shares),
        });
        for [x, y] in [[0.5, 0.2], [1.5, 0.2], [0.5, 1.2], [1.5, 1.2]] {
            let column = plan.nearest([x, y]);
            let entries = vec![
                (operator.place(column, operator.unknown(0, 0, 2)), 1.0),
                (operator.place(column, operator.unknown(1, 0, 0)), -1.0),
            ];
            operator.conductors.push(Conductor {
                entries,
                strength: 0.7,
            });
        }
        let mut load = operator.zeros();
        for (i, x) in plan.x.iter().enumerate() {
            for j in [2, 4] {
                load[operator.place(plan.column(i, j), 2)] = (x - 1.0).powi(2);
            }
        }
        (operator, load)
    }

    fn solved(operator: &Operator<Scalar>, load: &[f64]) -> Vec<f64> {
        let mut multigrid = Multigrid::new(operator, Coarsening::FULL).unwrap();
        let mut x = operator.zeros();
        let effort = Effort {
            tolerance: 1e-12,
            ..Effort::default()
        };
        conjugate_gradients(operator, &mut multigrid, (load, &mut x), &effort).unwrap();
        x
    }

    // Residuals of 1e-12.
    #[test]
    fn the_part_gives_the_solution_of_the_whole() {
        let (operator, load) = operator(0.0);
        for wanted in [[true, false], [false, true], [true, true]] {
            let mirror = Mirror::of(operator.plan(), wanted).unwrap();
            assert_eq!(mirror.across(), wanted);
            assert!(mirror.holds(&operator, &load));
            let stride = operator.matrix.stride;
            let folded = mirror.folded(&operator);
            let part = solved(&folded, &mirror.folded_load(&load, stride));
            let whole = solved(&operator, &load);
            let largest = whole.iter().fold(0.0_f64, |most, x| most.max(x.abs()));
            for (one, other) in mirror.spread_vector(&part, stride).iter().zip(&whole) {
                assert!((one - other).abs() < 1e-10 * largest, "{one} {other}");
            }
        }
    }

    #[test]
    fn what_leans_does_not_mirror() {
        let (leaning, load) = operator(0.01);
        let across_x = Mirror::of(leaning.plan(), [true, false]).unwrap();
        let across_y = Mirror::of(leaning.plan(), [false, true]).unwrap();
        assert!(!across_x.holds(&leaning, &load));
        assert!(across_y.holds(&leaning, &load));
        let (even, mut load) = operator(0.0);
        load[0] = 1.0;
        assert!(!across_x.holds(&even, &load));
    }

    #[test]
    fn lines_mirror_about_one_of_them_or_not_at_all() {
        let even = Plan::new(vec![0.0, 1.0, 2.0, 3.0], vec![0.0, 1.0, 3.0]);
        assert_eq!(Mirror::of(&even, [true, true]), None);
        let mirror = Mirror::of(&plan(), [true, true]).unwrap();
        let columns: Vec<usize> = (0..mirror.part().columns()).collect();
        assert_eq!(mirror.kept(&mirror.spread(&columns)), columns);
        for cell in 0..mirror.part().cells() {
            assert_eq!(mirror.image_cell(mirror.original_cell(cell)), cell);
        }
    }
}
