//! Free places moved off their lattice by Nelder and Mead on the screening model.

use std::sync::Mutex;

use argmin::{
    core::{CostFunction, Error, Executor},
    solver::neldermead::NelderMead,
};

use crate::{
    joint::Family,
    layout::{
        Constraints, Layout,
        patterns::{on_mirror, orbit, rounded_place},
        search::{Bank, Search},
    },
};

/// Iterations for each coordinate.
const ITERATIONS: u64 = 25;
/// First step of the simplex in lattice steps.
const FIRST_STEP: f64 = 0.5;
/// Spread of the simplex at which it ends, relative to the value.
const SPREAD: f64 = 1e-5;
/// Cost of a distance missed by one step, in values of the start.
const PENALTY: f64 = 10.0;

/// The layout as a function of the coordinates that may move, in lattice steps.
struct Problem<'a> {
    search: &'a Search<'a>,
    bank: &'a Bank<'a>,
    constraints: Constraints<'a>,
    start: &'a Layout,
    /// One place of each orbit, and which of its coordinates may move.
    firsts: &'a [([f64; 2], [bool; 2])],
    step: f64,
    /// What a missed distance costs, by step.
    penalty: f64,
    /// The best layout met that keeps its distances.
    best: &'a Mutex<Layout>,
}

impl Problem<'_> {
    fn places(&self, at: &[f64]) -> Vec<[f64; 2]> {
        let joint = &self.search.sizes[self.start.size].joint;
        let symmetry = self.search.arrange.symmetry;
        let mut next = at.iter();
        let mut places = Vec::with_capacity(self.start.places.len());
        for (first, moves) in self.firsts {
            let mut first = *first;
            for k in 0..2 {
                if moves[k]
                    && let Some(moved) = next.next()
                {
                    first[k] = moved * self.step;
                }
            }
            places.extend(orbit(joint, symmetry, rounded_place(first)));
        }
        places
    }
}

impl CostFunction for Problem<'_> {
    type Param = Vec<f64>;
    type Output = f64;

    fn cost(&self, at: &Self::Param) -> Result<f64, Error> {
        let places = self.places(at);
        let target = self.search.target;
        if places.len() != self.start.places.len() {
            // An orbit that met its mirror line has fewer places than asked for.
            return Ok(target.rank(self.start.value) + self.penalty);
        }
        let value = self.search.value(self.bank, (self.start.size, &places));
        let miss = self.constraints.miss(&places);
        if miss <= 0.0
            && let Ok(mut best) = self.best.lock()
            && target.rank(value) < target.rank(best.value)
        {
            *best = Layout {
                places,
                value,
                refined: true,
                ..best.clone()
            };
        }
        Ok(target.rank(value) + self.penalty * miss / self.step)
    }
}

/// A layout of free places moved to where the screening model likes it best; itself where no move
/// helps or its places follow a rule.
pub(super) fn refined(search: &Search, bank: &Bank, layout: &Layout) -> Layout {
    if layout.family != Family::Free || !layout.value.is_finite() {
        return layout.clone();
    }
    let joint = &search.sizes[layout.size].joint;
    let mut firsts: Vec<[f64; 2]> = Vec::new();
    for place in &layout.places {
        let images = orbit(joint, search.arrange.symmetry, *place);
        let known = |first: &[f64; 2]| {
            images
                .iter()
                .any(|image| (image[0] - first[0]).hypot(image[1] - first[1]) < 1e-5)
        };
        if !firsts.iter().any(known) {
            firsts.push(*place);
        }
    }
    let step = search.step();
    let symmetry = search.arrange.symmetry;
    let firsts: Vec<([f64; 2], [bool; 2])> = firsts
        .into_iter()
        .map(|first| (first, on_mirror(joint, symmetry, first).map(|held| !held)))
        .collect();
    let start: Vec<f64> = firsts
        .iter()
        .flat_map(|(first, moves)| (0..2).filter(|k| moves[*k]).map(|k| first[k] / step))
        .collect();
    if start.is_empty() {
        return layout.clone();
    }
    let simplex: Vec<Vec<f64>> = std::iter::once(start.clone())
        .chain((0..start.len()).map(|axis| {
            let mut corner = start.clone();
            corner[axis] += FIRST_STEP;
            corner
        }))
        .collect();
    let best = Mutex::new(layout.clone());
    let problem = Problem {
        search,
        bank,
        constraints: search.constraints(layout.size),
        start: layout,
        firsts: &firsts,
        step,
        penalty: PENALTY * layout.value.abs(),
        best: &best,
    };
    let iterations = ITERATIONS * start.len() as u64;
    let solver = NelderMead::new(simplex).with_sd_tolerance(SPREAD * layout.value.abs());
    if let Ok(solver) = solver {
        // However it ends, what it met on its way stands in `best`.
        let _ = Executor::new(problem, solver)
            .configure(|state| state.max_iters(iterations))
            .timer(false)
            .run();
    }
    best.into_inner().unwrap_or_else(|_| layout.clone())
}
