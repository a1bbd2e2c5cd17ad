//! How the answers move with values that make another joint of it: thickness, bow, film, gas pressure.

use crate::{
    estimate::chain::elastic::{LEAST_FORCE, Readings, moved, readings},
    joint::{Bounds, Joint, What},
    resistance::Path,
};

/// Error of source to sink between two solved values of one input that asks for no further one.
const CLOSE: f64 = 0.002;
/// Solved values of one input beyond which no further one is taken; what is left is told.
const MOST_NODES: usize = 9;
/// Places of the inputs, by turns, at which all are moved at once to see what is read there.
const PROBES: [[f64; 2]; 2] = [[0.7, -0.6], [-0.8, 0.5]];
/// Forces farther from the nominal one have another one solved half way, as a logarithm: a third.
const FAR: f64 = 1.1;
/// Narrowest reach to either side of the nominal force, likewise.
const LEAST_REACH: f64 = 0.1;

/// A value that makes another joint, by its number among the stated spreads, SI.
pub(super) type Stated = (usize, f64);

/// Who solves the nominal joint under other values.
pub(super) trait Remaker<E> {
    /// Paths of the joint of some values under the nominal forces times factors, as logarithms.
    fn paths(&self, values: &[Stated], forces: &[f64]) -> Result<Vec<Path>, E>;

    /// With everything else off nominal to one side (±1), under such a force: what the draws read
    /// without these values, and what is solved with them.
    fn probed(&self, values: &[Stated], at: (f64, f64)) -> Result<[Path; 2], E>;
}

/// What values that make another joint add to the readings of a path.
///
/// ```text
/// r(F, x₁, x₂, …) ≈ r(F) + Σ_i Δ_i(F, x_i),   Δ_i = r(F, x_i) − r(F) with all others nominal
/// ```
///
/// | symbol | quantity |
/// |---|---|
/// | `r` | readings: logarithms of resistances, shares of source to sink |
/// | `F` | clamp force of all bolts over the nominal one, as a logarithm |
/// | `x_i` | logarithm of a thickness, a film or a pressure, height of a bow |
///
/// Solved are the ends of every input and its nominal value at the least, the nominal and the largest
/// force, and halves of the intervals where a parabola through three is not close. What several inputs do
/// together, and with faces and conductivities, is held against solutions of all at once, which the
/// error tells.
/// Checked: `tests/validation_draws/remade.rs`.
#[derive(Clone, Debug)]
pub(super) struct Remade {
    axes: Vec<Axis>,
    /// Logarithms of the force over the nominal one, rising.
    forces: Vec<f64>,
    /// Largest error of source to sink where it was tried, relative.
    pub(super) error: f64,
}

/// One input.
#[derive(Clone, Debug)]
struct Axis {
    index: usize,
    bounds: Bounds,
    scale: Scale,
    /// On its scale, rising.
    nodes: Vec<f64>,
    /// One for each node and force.
    moves: Vec<Vec<Readings>>,
}

/// What an input is read along.
#[derive(Clone, Copy, Debug)]
enum Scale {
    Straight,
    Logarithm,
}

impl Scale {
    fn of(what: What) -> Self {
        match what {
            What::Bow(_) => Self::Straight,
            _ => Self::Logarithm,
        }
    }

    fn put(self, value: f64) -> f64 {
        match self {
            Self::Straight => value,
            Self::Logarithm => value.ln(),
        }
    }

    fn value(self, put: f64) -> f64 {
        match self {
            Self::Straight => put,
            Self::Logarithm => put.exp(),
        }
    }
}

impl Remade {
    /// Solves what the inputs of a joint ask for over a range of force over the nominal one; none where
    /// no input makes another joint.
    pub(super) fn through<E>(
        joint: &Joint,
        range: [f64; 2],
        solver: &impl Remaker<E>,
    ) -> Result<Option<Self>, E> {
        let inputs = joint.remaking();
        if inputs.is_empty() {
            return Ok(None);
        }
        let forces = forces(range);
        let base = solver.paths(&[], &forces)?;
        let base: Vec<Readings> = base.iter().map(readings).collect();
        let mut error: f64 = 0.0;
        let mut axes = Vec::with_capacity(inputs.len());
        for index in inputs {
            let (axis, left) = Axis::through((joint, index), (&forces, &base), solver)?;
            error = worse(error, left);
            axes.push(axis);
        }
        let mut remade = Self {
            axes,
            forces,
            error,
        };
        let ends = [remade.forces[0], remade.forces[remade.forces.len() - 1]];
        for (places, (end, side)) in PROBES.into_iter().zip(ends.into_iter().zip([1.0, -1.0])) {
            let axes = remade.axes.iter().enumerate();
            let values: Vec<(usize, f64, f64)> = axes
                .map(|(turn, axis)| {
                    let place = places[turn % 2];
                    (axis.index, place, axis.bounds.at(place))
                })
                .collect();
            let stated: Vec<Stated> = values.iter().map(|each| (each.0, each.2)).collect();
            let force = 0.5 * end;
            let [told, solved] = solver.probed(&stated, (force, side))?;
            let mut at = vec![0.0; joint.uncertain.len()];
            for (index, place, _) in &values {
                at[*index] = *place;
            }
            let told = moved(&told, &remade.shift(force, &at));
            let off = (told.source_to_sink / solved.source_to_sink - 1.0).abs();
            remade.error = worse(remade.error, off);
        }
        Ok(Some(remade))
    }

    /// What the stated spreads at their places add to the readings under a force over the nominal one,
    /// as a logarithm.
    pub(super) fn shift(&self, force: f64, places: &[f64]) -> Readings {
        let mut shift = [0.0; 7];
        let last = self.forces.len() - 1;
        let force = force.clamp(self.forces[0], self.forces[last]);
        let (first, weights) = parabola(&self.forces, force);
        for axis in &self.axes {
            let place = places.get(axis.index).copied().unwrap_or(0.0);
            // A spread within rounding has one node alone.
            if place == 0.0 || axis.nodes.len() < 3 {
                continue;
            }
            let x = axis.scale.put(axis.bounds.at(place));
            let (node, along) = parabola(&axis.nodes, x);
            for (moves, along) in axis.moves[node..].iter().zip(along) {
                for (moved, weight) in moves[first..].iter().zip(weights) {
                    for (sum, each) in shift.iter_mut().zip(moved) {
                        *sum += along * weight * each;
                    }
                }
            }
        }
        shift
    }
}

impl Axis {
    /// Solves one input; with what is left between its nodes.
    fn through<E>(
        (joint, index): (&Joint, usize),
        (forces, base): (&[f64], &[Readings]),
        solver: &impl Remaker<E>,
    ) -> Result<(Self, f64), E> {
        let stated = &joint.uncertain[index];
        let scale = Scale::of(stated.what);
        let bounds = stated.bounds;
        let solve = |x: f64| -> Result<Vec<Readings>, E> {
            let paths = solver.paths(&[(index, scale.value(x))], forces)?;
            let moved = paths.iter().map(readings).zip(base);
            Ok(moved.map(|(there, here)| less(&there, here)).collect())
        };
        let nominal = scale.put(bounds.nominal);
        let mut axis = Self {
            index,
            bounds,
            scale,
            nodes: vec![nominal],
            moves: vec![vec![[0.0; 7]; forces.len()]],
        };
        for end in [bounds.low, bounds.high] {
            let x = scale.put(end);
            if (x - nominal).abs() > 0.0 {
                let moves = solve(x)?;
                axis.insert(x, moves);
            }
        }
        if let [low, high] = axis.nodes[..] {
            let x = 0.5 * (low + high);
            let moves = solve(x)?;
            axis.insert(x, moves);
        }
        loop {
            let halves: Vec<f64> = axis
                .nodes
                .windows(2)
                .map(|pair| 0.5 * (pair[0] + pair[1]))
                .collect();
            let solved = halves
                .iter()
                .map(|x| solve(*x))
                .collect::<Result<Vec<_>, E>>()?;
            let mut left: f64 = 0.0;
            for (x, solved) in halves.iter().zip(&solved) {
                let (first, weights) = parabola(&axis.nodes, *x);
                for (force, (solved, base)) in solved.iter().zip(base).enumerate() {
                    let mut told = *base;
                    for (moves, weight) in axis.moves[first..].iter().zip(weights) {
                        for (sum, each) in told.iter_mut().zip(&moves[force]) {
                            *sum += weight * each;
                        }
                    }
                    let true_ = std::array::from_fn(|reading| base[reading] + solved[reading]);
                    left = worse(left, (whole(&told) / whole(&true_) - 1.0).abs());
                }
            }
            let full = axis.nodes.len() + halves.len() > MOST_NODES;
            if left <= CLOSE || full || left.is_nan() {
                return Ok((axis, left));
            }
            for (x, moves) in halves.into_iter().zip(solved) {
                axis.insert(x, moves);
            }
        }
    }

    fn insert(&mut self, x: f64, moves: Vec<Readings>) {
        let place = self.nodes.partition_point(|node| *node < x);
        self.nodes.insert(place, x);
        self.moves.insert(place, moves);
    }
}

/// Source to sink of readings, K/W: perfect contact and what is added to it, or its share.
fn whole(read: &Readings) -> f64 {
    let [_, perfect, added, .., share] = *read;
    if added.is_finite() {
        perfect.exp() + added.exp()
    } else {
        perfect.exp() / (1.0 - share)
    }
}

fn less(there: &Readings, here: &Readings) -> Readings {
    std::array::from_fn(|reading| there[reading] - here[reading])
}

/// First of the three nearest nodes, of three or more, and their weights in the parabola through them.
fn parabola(nodes: &[f64], x: f64) -> (usize, [f64; 3]) {
    let last = nodes.len() - 1;
    let nearest = (0..=last)
        .min_by(|one, other| {
            (nodes[*one] - x)
                .abs()
                .total_cmp(&(nodes[*other] - x).abs())
        })
        .unwrap_or(0);
    let first = nearest.clamp(1, last - 1) - 1;
    let [a, b, c] = [nodes[first], nodes[first + 1], nodes[first + 2]];
    let weights = [
        (x - b) * (x - c) / ((a - b) * (a - c)),
        (x - a) * (x - c) / ((b - a) * (b - c)),
        (x - a) * (x - b) / ((c - a) * (c - b)),
    ];
    (first, weights)
}

/// Forces at which the inputs are solved: the ends and nominal, and half way to an end that lies far.
fn forces([low, high]: [f64; 2]) -> Vec<f64> {
    let least = low.max(LEAST_FORCE).ln().min(-LEAST_REACH);
    let most = high.ln().max(LEAST_REACH);
    let mut forces = vec![least];
    if least < -FAR {
        forces.push(0.5 * least);
    }
    forces.push(0.0);
    if most > FAR {
        forces.push(0.5 * most);
    }
    forces.push(most);
    forces
}

/// The larger of two errors; not a number where one of them is none.
fn worse(one: f64, other: f64) -> f64 {
    if one.is_nan() || other.is_nan() {
        f64::NAN
    } else {
        one.max(other)
    }
}
