//! Newton steps of the contact: which columns touch, and the displacements then.

use crate::{
    numerics::multigrid::{Coarsening, Effort, Factor, Multigrid, Stalled, conjugate_gradients},
    numerics::{banded::NotPositiveDefinite, columns::Solid},
    pressure::elastic::{
        Faces, Failure, Field, Health, Mesh, Problem, Stage,
        field::State,
        system::{Pairing, System, stuck},
    },
};

/// Where the active set starts.
pub(super) enum Start<'a> {
    /// Around the bolts.
    Bolts,
    /// Where a field stood.
    Field(&'a Field),
    /// Where a rule says.
    Set(&'a (dyn Fn([f64; 2]) -> bool + Sync)),
}

/// Steps after which the contact counts as not found; a thin plate on a soft layer took more than 40,
/// the energy falling in each.
const MOST_STEPS: usize = 100;
/// Steps after which columns of stuck faces that come and go are held.
const PATIENCE: usize = 40;
/// How often a column may leave then.
const LEAVES: u8 = 2;
/// Iterations of one linear solution after which it counts as stalled; a sheet of a twentieth of a
/// millimetre between plates took more than 400.
const MOST_ITERATIONS: usize = 1500;
/// Residuals of the linear solutions over the load: the first, while many columns change, when few
/// do, and the last.
const FIRST: f64 = 1e-2;
const MANY_CHANGE: f64 = 3e-3;
const FEW_CHANGE: f64 = 3e-4;
const LAST: f64 = 1e-7;
/// Changes that count as many.
const MANY: usize = 30;
/// Share of the active set that may change before the coarsest factor follows.
const LAZY: f64 = 0.05;
/// How far contact is expected beyond the bearing radius, in thinner plates.
const EXPECTED: f64 = 0.6;
/// Rise of the energy, relative to its size, that counts as rounding or an unfinished solution.
const LEVEL: f64 = 1e-9;

/// Everything that changes from step to step.
struct Search<'a> {
    problem: &'a Problem<'a>,
    system: System,
    multigrid: Multigrid<Solid>,
    displacement: Vec<f64>,
    active: Vec<Vec<bool>>,
    iterations: usize,
    energy: f64,
    worst_rise: f64,
    shortened: usize,
    /// How often every column has left the set since patience ended.
    left: Vec<Vec<u8>>,
}

pub(super) fn solve(
    problem: &Problem,
    (mesh, mut system): (Mesh, System),
    start: &Start,
) -> Result<Field, Failure> {
    let previous = match start {
        Start::Field(field) if field.mesh.plan == mesh.plan => Some(&field.state),
        _ => None,
    };
    let active = match previous {
        Some(state) if state.fits(&system.operator.zeros(), system.pairings.len()) => {
            state.active.clone()
        }
        _ => first_set(problem, &mesh, &system, start),
    };
    let displacement = match previous {
        Some(state) if state.displacement.len() == system.load.len() => state.displacement.clone(),
        _ => system.operator.zeros(),
    };
    for (pairing, active) in (0..system.pairings.len()).zip(&active) {
        set_ties(problem, &mut system, pairing, active);
    }
    let multigrid = Multigrid::new(&system.operator, coarsening(problem)).map_err(indefinite)?;
    let mut search = Search {
        problem,
        system,
        multigrid,
        displacement,
        active,
        iterations: 0,
        energy: f64::INFINITY,
        worst_rise: 0.0,
        shortened: 0,
        left: Vec::new(),
    };
    let (steps, residual) = search.run()?;
    search.field(mesh, steps, residual)
}

/// Lines are dropped while cells stay within a few plate thicknesses: wider ones cannot bend.
fn coarsening(problem: &Problem) -> Coarsening {
    let thinnest = problem
        .bodies
        .iter()
        .map(|body| body.layers[body.main].thickness)
        .fold(f64::INFINITY, f64::min);
    Coarsening {
        widest: 4.0 * thinnest,
        cheap: 2e6,
        dearest: 2e8,
    }
}

fn indefinite(fault: NotPositiveDefinite) -> Failure {
    Failure::NotConverged {
        solver: "factor of the columns",
        iterations: fault.row,
        residual: f64::NAN,
    }
}

fn stalled(fault: Stalled) -> Failure {
    Failure::NotConverged {
        solver: "conjugate gradients of the contact",
        iterations: fault.iterations,
        residual: fault.residual,
    }
}

/// The set that the first step takes as touching.
fn first_set(problem: &Problem, mesh: &Mesh, system: &System, start: &Start) -> Vec<Vec<bool>> {
    let thinnest = problem
        .bodies
        .iter()
        .map(super::problem::Body::thickness)
        .fold(f64::INFINITY, f64::min);
    let near = |place: [f64; 2]| {
        problem.bolts.iter().any(|bolt| {
            let distance = (place[0] - bolt.at[0]).hypot(place[1] - bolt.at[1]);
            distance <= bolt.head.outer + EXPECTED * thinnest
        })
    };
    let interfaces = problem.interfaces.len();
    system
        .pairings
        .iter()
        .enumerate()
        .map(|(index, pairing)| {
            let touches = |column: usize| {
                let place = mesh.plan.place(column);
                match start {
                    // Heads and nuts touch all over at first.
                    _ if index >= interfaces => true,
                    Start::Set(rule) => rule(place),
                    _ => near(place),
                }
            };
            (0..mesh.plan.columns())
                .map(|column| pairing.weight[column] > 0.0 && touches(column))
                .collect()
        })
        .collect()
}

/// Gives the ties of a pair the stiffness of its touching columns.
fn set_ties(problem: &Problem, system: &mut System, index: usize, active: &[bool]) {
    let Pairing {
        weight,
        stiffness,
        tie,
        shear,
        ..
    } = &system.pairings[index];
    let strength = |stiffness: f64| -> Vec<f64> {
        active
            .iter()
            .zip(weight)
            .map(|(active, weight)| if *active { stiffness * weight } else { 0.0 })
            .collect()
    };
    system.operator.set_tie(*tie, &strength(*stiffness));
    if let (Some(ties), Some(interface)) = (shear, problem.interfaces.get(index)) {
        let strength = strength(stuck(interface.compliance));
        for tie in ties {
            system.operator.set_tie(*tie, &strength);
        }
    }
}

impl Search<'_> {
    /// Steps until the set repeats; steps taken and the last residual.
    fn run(&mut self) -> Result<(usize, f64), Failure> {
        let scale = self.load_length();
        let mut tolerance = FIRST;
        let mut changed = usize::MAX;
        for step in 1..=MOST_STEPS {
            let target = self.target();
            let before = self.displacement.clone();
            let effort = Effort {
                tolerance,
                reference: Some(scale),
                most: MOST_ITERATIONS,
            };
            let solved = conjugate_gradients(
                &self.system.operator,
                &mut self.multigrid,
                (&target, &mut self.displacement),
                &effort,
            )
            .map_err(stalled)?;
            self.iterations += solved.iterations;
            self.descend(&before);
            let mut sets = self.touching();
            if step > PATIENCE {
                self.hold(&mut sets);
            }
            changed = count_changes(&self.active, &sets);
            self.problem.tell(Stage::Contact, step, solved.residual);
            if changed == 0 && tolerance <= LAST {
                return Ok((step, solved.residual));
            }
            tolerance = match changed {
                0 => LAST,
                _ if tolerance <= LAST => LAST,
                _ if changed > MANY => MANY_CHANGE,
                _ => FEW_CHANGE,
            };
            self.take(sets, changed)?;
        }
        Err(Failure::NotConverged {
            solver: "active set of the contact",
            iterations: MOST_STEPS,
            residual: changed as f64,
        })
    }

    fn load_length(&self) -> f64 {
        let load = &self.system.load;
        self.system.operator.dot(load, load).sqrt()
    }

    /// Right-hand side with the initial gaps of the touching columns.
    fn target(&self) -> Vec<f64> {
        let mut target = self.system.load.clone();
        for (pairing, active) in self.system.pairings.iter().zip(&self.active) {
            for (column, _) in active.iter().enumerate().filter(|(_, active)| **active) {
                let push = pairing.stiffness * pairing.weight[column] * pairing.opening[column];
                target[self.system.operator.place(column, pairing.plus)] -= push;
                target[self.system.operator.place(column, pairing.minus)] += push;
            }
        }
        target
    }

    /// Where the faces have closed.
    fn touching(&self) -> Vec<Vec<bool>> {
        let operator = &self.system.operator;
        self.system
            .pairings
            .iter()
            .map(|pairing| {
                let weights = pairing.weight.iter().enumerate();
                weights
                    .map(|(column, weight)| {
                        *weight > 0.0 && pairing.gap(operator, &self.displacement, column) < 0.0
                    })
                    .collect()
            })
            .collect()
    }

    /// Holds columns of stuck faces that keep leaving the set.
    ///
    /// A column at the edge of contact may slide open when it sticks and close when it slides: it has
    /// no state of its own, and no energy decides. Held, it pulls by next to nothing, which the
    /// balance of forces and the complementarity of the field tell.
    fn hold(&mut self, sets: &mut [Vec<bool>]) {
        let stuck = |index: usize| {
            let interface = self.problem.interfaces.get(index);
            interface.is_some_and(|one| one.faces == Faces::Stuck)
        };
        if self.left.is_empty() {
            self.left = sets.iter().map(|set| vec![0; set.len()]).collect();
        }
        for index in (0..sets.len()).filter(|index| stuck(*index)) {
            let columns = sets[index].iter_mut().zip(&self.active[index]);
            for ((touches, touched), left) in columns.zip(&mut self.left[index]) {
                if *touched && !*touches {
                    *left = left.saturating_add(1);
                    *touches = *left > LEAVES;
                }
            }
        }
    }

    fn take(&mut self, sets: Vec<Vec<bool>>, changed: usize) -> Result<(), Failure> {
        if changed == 0 {
            return Ok(());
        }
        let size: usize = sets.iter().flatten().filter(|active| **active).count();
        self.active = sets;
        for index in 0..self.active.len() {
            set_ties(self.problem, &mut self.system, index, &self.active[index]);
        }
        let factor = if (changed as f64) < LAZY * size as f64 {
            Factor::Kept
        } else {
            Factor::Renewed
        };
        self.multigrid
            .renew(&self.system.operator, factor)
            .map_err(indefinite)
    }

    /// Energy of the bodies and their loads without contact, as a quadratic along a step: value at
    /// its start, slope there, curvature.
    fn smooth_energy(&self, before: &[f64]) -> [f64; 3] {
        let operator = &self.system.operator;
        let step: Vec<f64> = self
            .displacement
            .iter()
            .zip(before)
            .map(|(new, old)| new - old)
            .collect();
        let (mut image, mut step_image) = (operator.zeros(), operator.zeros());
        operator.product(before, &mut image);
        operator.product(&step, &mut step_image);
        let mut value =
            0.5 * operator.dot(before, &image) - operator.dot(&self.system.load, before);
        let mut slope = operator.dot(&step, &image) - operator.dot(&self.system.load, &step);
        let mut curvature = operator.dot(&step, &step_image);
        // The operator holds the ties of the touching columns; they are no part of the bodies.
        for (pairing, active) in self.system.pairings.iter().zip(&self.active) {
            for (column, _) in active.iter().enumerate().filter(|(_, active)| **active) {
                let strength = pairing.stiffness * pairing.weight[column];
                let apart =
                    |of: &[f64]| pairing.gap(operator, of, column) - pairing.opening[column];
                let (at, along) = (apart(before), apart(&step));
                value -= 0.5 * strength * at * at;
                slope -= strength * at * along;
                curvature -= strength * along * along;
            }
        }
        [value, slope, curvature]
    }

    /// Keeps a step that lowers the energy; shortens any other to where the energy is least along it.
    fn descend(&mut self, before: &[f64]) {
        let sticks = self.problem.interfaces.iter();
        if sticks.clone().any(|one| one.faces == Faces::Stuck) {
            // Ties that come and go with the contact leave no energy to compare.
            return;
        }
        let smooth = self.smooth_energy(before);
        let gaps = self.gaps(before);
        let energy = |part: f64| {
            smooth[0] + part * (smooth[1] + 0.5 * part * smooth[2]) + contact_energy(&gaps, part)
        };
        let (start, full) = (energy(0.0), energy(1.0));
        let size = start.abs().max(full.abs());
        let mut reached = full;
        if full > start + LEVEL * size {
            let part = least(|part| smooth[1] + part * smooth[2] + contact_slope(&gaps, part));
            reached = energy(part);
            for (new, old) in self.displacement.iter_mut().zip(before) {
                *new = old + part * (*new - old);
            }
            self.shortened += 1;
        }
        if self.energy.is_finite() && size > 0.0 {
            self.worst_rise = self.worst_rise.max((reached - start) / size);
        }
        self.energy = reached;
    }

    /// Strength, gap before and change of gap of every column of every pair.
    fn gaps(&self, before: &[f64]) -> Vec<[f64; 3]> {
        let operator = &self.system.operator;
        let mut gaps = Vec::new();
        for pairing in &self.system.pairings {
            for (column, weight) in pairing.weight.iter().enumerate() {
                if *weight > 0.0 {
                    let old = pairing.gap(operator, before, column);
                    let new = pairing.gap(operator, &self.displacement, column);
                    gaps.push([pairing.stiffness * weight, old, new - old]);
                }
            }
        }
        gaps
    }

    fn field(self, mesh: Mesh, steps: usize, residual: f64) -> Result<Field, Failure> {
        let health = Health {
            newton_steps: steps,
            cg_iterations: self.iterations,
            unknowns: self.system.operator.unknowns(),
            levels: self.multigrid.columns(),
            force_balance: 0.0,
            complementarity: 0.0,
            energy_rise: self.worst_rise,
            shortened_steps: self.shortened,
            residual,
        };
        let state = State {
            displacement: self.displacement,
            active: self.active,
        };
        Field::read(self.problem, (mesh, &self.system), (state, health))
    }
}

fn count_changes(old: &[Vec<bool>], new: &[Vec<bool>]) -> usize {
    old.iter()
        .flatten()
        .zip(new.iter().flatten())
        .filter(|(old, new)| old != new)
        .count()
}

fn contact_energy(gaps: &[[f64; 3]], part: f64) -> f64 {
    gaps.iter()
        .map(|[strength, gap, change]| 0.5 * strength * (gap + part * change).min(0.0).powi(2))
        .sum()
}

fn contact_slope(gaps: &[[f64; 3]], part: f64) -> f64 {
    gaps.iter()
        .map(|[strength, gap, change]| strength * change * (gap + part * change).min(0.0))
        .sum()
}

/// Where a rising slope passes zero between 0 and 1.
fn least(slope: impl Fn(f64) -> f64) -> f64 {
    let (mut low, mut high) = (0.0, 1.0);
    for _ in 0..50 {
        let middle = 0.5 * (low + high);
        if slope(middle) < 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    0.5 * (low + high)
}
