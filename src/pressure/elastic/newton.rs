//! Newton steps of the contact: which columns touch, and the displacements then.

mod course;
mod descent;

use crate::{
    numerics::multigrid::{Coarsening, Effort, Factor, Multigrid, Stalled, conjugate_gradients},
    numerics::{banded::NotPositiveDefinite, columns::Solid},
    pressure::elastic::{
        Body, Failure, Field, HeadModel, Health, Mesh, Problem, Stage,
        field::{State, contradiction},
        system::{Pairing, System, stuck},
    },
};

use course::{Course, MOST_STEPS};

/// Where the active set starts.
pub(super) enum Start<'a> {
    /// Around the bolts.
    Bolts,
    /// Where a field stood.
    Field(&'a Field),
    /// Where a field of a coarser grid touches.
    Coarser(&'a Field),
    /// Where a rule says.
    Set(&'a (dyn Fn([f64; 2]) -> bool + Sync)),
}

/// Iterations of one linear solution after which it counts as stalled.
const MOST_ITERATIONS: usize = 1500;
/// Share of the active set that may change before the coarsest factor follows.
const LAZY: f64 = 0.05;
/// How far contact is expected beyond the bearing radius, in thinner plates.
const EXPECTED: f64 = 0.6;
/// Share of its energy norm at the start that the error of a linear solution keeps, but for the last.
const SOFT_MOTIONS: f64 = 1e-2;
/// Steps after which columns may go on changing that press next to nothing, and how much that is: their
/// gap or closure over the deepest closure, which is their pressure over the peak.
const LONG: usize = 100;
const NEXT_TO_NOTHING: f64 = 1e-4;
/// Changes of a column in accurate solutions after which stuck faces slide there.
const WAVERING: u8 = 3;

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
    /// Stiffness of the faces over the stated one, 1 in the end.
    hardness: f64,
    /// How often a column has changed in accurate solutions.
    changes: Vec<Vec<u8>>,
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
    let heads_rock = problem.head == HeadModel::Rigid && previous.is_none();
    let hardness = Course::new(problem.fineness, heads_rock).hardness;
    let changes: Vec<Vec<u8>> = active.iter().map(|set| vec![0; set.len()]).collect();
    for (index, active) in active.iter().enumerate() {
        set_ties(
            problem,
            &mut system,
            index,
            (active, &changes[index], hardness),
        );
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
        hardness,
        changes,
    };
    let (steps, residual) = search.run()?;
    search.field(mesh, steps, residual)
}

/// Lines are dropped while cells stay within a few plate thicknesses: wider ones cannot bend.
fn coarsening(problem: &Problem) -> Coarsening {
    let thinnest = problem
        .bodies
        .iter()
        .map(Body::bending_thickness)
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
            let coarse = match start {
                Start::Coarser(field) => field.state.active.get(index).map(|set| (field, set)),
                _ => None,
            };
            let touches = |column: usize| {
                let place = mesh.plan.place(column);
                match start {
                    // Heads and nuts touch all over at first.
                    _ if index >= interfaces => true,
                    Start::Set(rule) => rule(place),
                    Start::Coarser(_) => coarse.is_some_and(|(field, set)| {
                        let around = field.mesh.plan.around(place).into_iter().flatten();
                        let touching = around.filter(|(column, _)| set[*column]);
                        touching.map(|(_, weight)| weight).sum::<f64>() > 0.5
                    }),
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
///
/// Columns at the edge of contact press too little to hold by friction: those that waver slide.
fn set_ties(
    problem: &Problem,
    system: &mut System,
    index: usize,
    (active, changes, hardness): (&[bool], &[u8], f64),
) {
    let Pairing {
        weight,
        stiffness,
        tie,
        shear,
        ..
    } = &system.pairings[index];
    let strength = |stiffness: f64, holds: &dyn Fn(usize) -> bool| -> Vec<f64> {
        let columns = weight.iter().enumerate();
        columns
            .map(|(column, weight)| {
                if active[column] && holds(column) {
                    hardness * stiffness * weight
                } else {
                    0.0
                }
            })
            .collect()
    };
    system
        .operator
        .set_tie(*tie, &strength(*stiffness, &|_| true));
    if let (Some(ties), Some(interface)) = (shear, problem.interfaces.get(index)) {
        let sticks = |column: usize| changes[column] < WAVERING;
        let strength = strength(stuck(interface.compliance), &sticks);
        for tie in ties {
            system.operator.set_tie(*tie, &strength);
        }
    }
}

impl Search<'_> {
    /// Steps until the set repeats; steps taken and the last residual.
    fn run(&mut self) -> Result<(usize, f64), Failure> {
        let mut course = Course::new(self.problem.fineness, self.hardness < 1.0);
        let mut changed = usize::MAX;
        for step in 1.. {
            let (sets, residual) = self.step(&course)?;
            let last = changed;
            changed = count_changes(&self.active, &sets);
            self.problem.tell(Stage::Contact, step, residual);
            if course.is_last() && (changed == 0 || step >= LONG && self.hardly_wavers()) {
                return Ok((step, residual));
            }
            if course.is_accurate() {
                self.note_changes(&sets);
            }
            course.after(step, [last, changed]);
            if course.is_over(step) {
                break;
            }
            self.take(sets, changed, course.hardness)?;
        }
        Err(Failure::NotConverged {
            solver: "active set of the contact",
            iterations: MOST_STEPS,
            residual: changed as f64,
        })
    }

    /// One linear solution with the present set; where faces have closed then, and the residual.
    fn step(&mut self, course: &Course) -> Result<(Vec<Vec<bool>>, f64), Failure> {
        let target = self.target();
        let before = self.displacement.clone();
        let effort = Effort {
            tolerance: course.tolerance,
            energy: course.trusts_energy().then_some(SOFT_MOTIONS),
            reference: Some(self.load_length()),
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
        Ok((self.touching(), solved.residual))
    }

    /// Whether the columns that contradict the set do so by next to nothing.
    fn hardly_wavers(&self) -> bool {
        let pairs = self.system.pairings.iter().zip(&self.active);
        let worst = pairs.map(|(pairing, active)| {
            contradiction((pairing, &self.system), &self.displacement, active)
        });
        worst.fold(0.0, f64::max) <= NEXT_TO_NOTHING
    }

    /// Counts which columns change while solutions are accurate.
    fn note_changes(&mut self, sets: &[Vec<bool>]) {
        let old = self.active.iter().flatten();
        let new = sets.iter().flatten();
        let counts = self.changes.iter_mut().flatten();
        for ((old, new), count) in old.zip(new).zip(counts) {
            if old != new {
                *count = count.saturating_add(1);
            }
        }
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
                let push = self.hardness
                    * pairing.stiffness
                    * pairing.weight[column]
                    * pairing.opening[column];
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

    /// Takes a set and the hardness of the faces over into ties and levels.
    fn take(&mut self, sets: Vec<Vec<bool>>, changed: usize, hardness: f64) -> Result<(), Failure> {
        let other_hardness = (hardness - self.hardness).abs() > 0.0;
        if changed == 0 && !other_hardness {
            return Ok(());
        }
        if other_hardness {
            // Another energy from here on.
            self.hardness = hardness;
            self.energy = f64::INFINITY;
        }
        let size: usize = sets.iter().flatten().filter(|active| **active).count();
        self.active = sets;
        for (index, active) in self.active.iter().enumerate() {
            let state = (&active[..], &self.changes[index][..], self.hardness);
            set_ties(self.problem, &mut self.system, index, state);
        }
        let factor = if (changed as f64) < LAZY * size as f64 && !other_hardness {
            Factor::Kept
        } else {
            Factor::Renewed
        };
        self.multigrid
            .renew(&self.system.operator, factor)
            .map_err(indefinite)
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
