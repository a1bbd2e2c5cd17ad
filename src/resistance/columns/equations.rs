//! The equations of a stack with its terminals, and their solution.

mod family;

pub use family::Family;
pub(super) use family::Reduced;

use crate::{
    numerics::{
        columns::{Conductor, Layer, Mirror, Operator, Scalar, Tie, lumped},
        multigrid::{Coarsening, Effort, Factor, Multigrid, Solved, Stalled, conjugate_gradients},
    },
    resistance::{
        Failure,
        columns::{
            Conductivity, Health, Stack, Terminals,
            terminals::{Ends, Grip, Patch},
        },
    },
};

/// What this solution is called in a failure.
const SOLVER: &str = "heat through the columns, by conjugate gradients,";
/// Stiffness of a held face over that of its body through the thickness; the mean of what is left
/// is taken off, so that only the spread within the face matters: a millionth of the body's own.
const HELD: f64 = 1e6;
/// The same in a stack with parts of other conductivities: a core passes so little heat that a stiffer
/// face would leave too few digits of it.
const HELD_LIGHTLY: f64 = 1e4;
/// Residual asked for, over the load.
pub(super) const TOLERANCE: f64 = 1e-8;
/// Heat that may be lost between source and sink before the residual is made smaller; more where more
/// residual is asked for.
const BALANCE: f64 = 1e-9;
/// Heat that may be lost before the solution is refused.
const LOST: f64 = 1e-6;
/// Times that the residual is made smaller, each by ten.
const ROUNDS: usize = 6;
/// Iterations of one round; usual are 15 to 30.
const MOST: usize = 400;
/// Guidance alone: bodies that nothing joins hang together by this share of their stiffness.
const THREAD: f64 = 1e-6;

/// How bodies meet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Arrangement {
    /// Each has its own nodes; local conductances join them.
    Apart,
    /// Touching faces share their nodes: perfect contact.
    Merged,
}

/// One set of equations, ready for any local conductance.
pub(super) struct Equations {
    operator: Operator<Scalar>,
    /// Where everything mirrors, with the equations of the part that is solved for the whole.
    folded: Option<(Mirror, Operator<Scalar>)>,
    /// Of the equations that are solved; made when it is first needed.
    multigrid: Option<Multigrid<Scalar>>,
    /// For every body its group and its lowest node there.
    places: Vec<[usize; 2]>,
    /// For every part of every interface its tie.
    ties: Vec<Vec<usize>>,
    load: Vec<f64>,
    /// Conductance of an isothermal source to the plate below, W/K; none for uniform flux.
    gripped: Option<f64>,
    /// Unknowns of the sinks with what they conduct away, W/K.
    drains: Vec<(usize, f64)>,
    /// For every heated zone its unknowns with the weights of its mean, and its share of the heat.
    zones: Vec<(Vec<(usize, f64)>, f64)>,
    /// Residual asked for, over the load.
    pub tolerance: f64,
    /// Temperatures of the last solution.
    pub rise: Vec<f64>,
    /// Guidance: conductance of the bolts at every column, W/K.
    beside: Vec<f64>,
    threads: Vec<Vec<Vec<f64>>>,
}

impl Equations {
    pub(super) fn new(
        stack: &Stack,
        ends: &Ends,
        (terminals, conductivity): (&Terminals, &[Conductivity]),
        arrangement: Arrangement,
    ) -> Self {
        let (groups, places) = arranged(stack, arrangement);
        let mut operator = Operator::<Scalar>::new(&stack.plan, &groups);
        for (index, body) in stack.bodies.iter().enumerate() {
            let [group, foot] = places[index];
            for (own, (layer, first)) in body.layers.iter().zip(body.first_nodes()).enumerate() {
                for (shares, conductivity) in stack.made((index, own), conductivity[index]) {
                    operator.add_layer(&Layer {
                        shares: &shares,
                        group,
                        first_node: foot + first,
                        heights: &layer.heights,
                        degree: layer.degree,
                        constants: conductivity.scalar(),
                    });
                }
            }
        }
        let threads = threads(stack, conductivity);
        let ties = match arrangement {
            Arrangement::Merged => Vec::new(),
            Arrangement::Apart => add_faces(stack, &places, &threads, &mut operator),
        };
        let held = if stack.is_plain() { HELD } else { HELD_LIGHTLY };
        let factor = |body: usize, grip: Grip| {
            let [x, y] = conductivity[body].along;
            match grip {
                Grip::None => 0.0,
                Grip::Film(coefficient) => coefficient,
                Grip::Held => held * conductivity[body].through / stack.bodies[body].thickness(),
                Grip::Cut(thin) | Grip::Side(thin) => thin * (x * y).sqrt(),
            }
        };
        let last = stack.bodies.len() - 1;
        let unknown = |operator: &Operator<Scalar>, body: usize, node: usize| {
            operator.unknown(places[body][0], 0, places[body][1] + node)
        };
        // Adds the tie of a patch to the ground and returns what it conducts at every place.
        let grip = |operator: &mut Operator<Scalar>, body: usize, patch: &Patch| {
            let plus = unknown(operator, body, patch.node);
            let stencil = patch.covered.times(factor(body, patch.grip)).stencil;
            let pulls: Vec<(usize, f64)> = stencil
                .iter()
                .map(|row| row.iter().sum::<f64>())
                .enumerate()
                .filter(|(_, pull)| *pull != 0.0)
                .map(|(column, pull)| (operator.place(column, plus), pull))
                .collect();
            operator.add_tie(Tie {
                plus,
                minus: None,
                stencil,
            });
            pulls
        };
        let mut drains = Vec::new();
        for patch in &ends.sinks {
            drains.extend(grip(&mut operator, last, patch));
        }
        let mut zones = Vec::new();
        let mut gripped = None;
        for (patches, share) in &ends.source {
            let mut own = Vec::new();
            for patch in patches {
                if ends.isothermal {
                    own.extend(grip(&mut operator, 0, patch));
                } else {
                    let plus = unknown(&operator, 0, patch.node);
                    let weights = patch.covered.weights.iter().enumerate();
                    let heated = weights.filter(|(_, weight)| **weight != 0.0);
                    own.extend(heated.map(|(column, w)| (operator.place(column, plus), *w)));
                }
            }
            let whole: f64 = own.iter().map(|(_, weight)| weight).sum();
            gripped = ends.isothermal.then_some(whole);
            for (_, weight) in &mut own {
                *weight /= whole;
            }
            zones.push((own, *share));
        }
        let mut beside = vec![0.0; stack.plan.columns()];
        for (bolt, both) in terminals.bolts.iter().zip(&ends.bolts) {
            let Some([head, seat]) = both.as_ref().filter(|_| bolt.strength > 0.0) else {
                continue;
            };
            let mut entries = Vec::new();
            for (end, sign) in [(head, 1.0), (seat, -1.0)] {
                for (body, node, column, weight) in end {
                    let place = operator.place(*column, unknown(&operator, *body, *node));
                    entries.push((place, sign * weight));
                }
            }
            for (_, _, column, weight) in head {
                beside[*column] += bolt.strength * weight;
            }
            operator.conductors.push(Conductor {
                entries,
                strength: bolt.strength,
            });
        }
        let mut load = operator.zeros();
        for (zone, share) in &zones {
            for (place, weight) in zone {
                load[*place] += share * weight * gripped.unwrap_or(1.0);
            }
        }
        Self {
            rise: operator.zeros(),
            operator,
            folded: None,
            multigrid: None,
            places,
            ties,
            load,
            gripped,
            drains,
            zones,
            tolerance: TOLERANCE,
            beside,
            threads,
        }
    }

    /// Place of a node in the vector of temperatures.
    pub(super) fn place(&self, body: usize, node: usize, column: usize) -> usize {
        let [group, first] = self.places[body];
        let unknown = self.operator.unknown(group, 0, first + node);
        self.operator.place(column, unknown)
    }

    /// Joins the bodies: `conductances` holds one value for every column of every part, W/K.
    pub(super) fn join(&mut self, conductances: &[Vec<Vec<f64>>]) -> Result<(), Failure> {
        self.set_faces(conductances);
        self.find_mirror();
        // Bolts are rank-one terms that the cycle does not feel; it sees them beside the faces, in
        // the first part that a column belongs to.
        let mut guided = conductances.to_vec();
        for (parts, threads) in guided.iter_mut().zip(&self.threads) {
            let mut beside = self.beside.clone();
            for (part, threads) in parts.iter_mut().zip(threads) {
                for ((guided, thread), bolt) in part.iter_mut().zip(threads).zip(&mut beside) {
                    if *thread > 0.0 {
                        *guided += thread + std::mem::take(bolt);
                    }
                }
            }
        }
        self.set_faces(&guided);
        self.guide()?;
        self.set_faces(conductances);
        Ok(())
    }

    /// Gives the ties of the faces their conductances, in the whole and in its part.
    fn set_faces(&mut self, conductances: &[Vec<Vec<f64>>]) {
        for (parts, ties) in conductances.iter().zip(&self.ties) {
            for (part, tie) in parts.iter().zip(ties) {
                self.operator.set_tie(*tie, part);
            }
        }
        if let Some((mirror, folded)) = &mut self.folded {
            mirror.refold(&self.operator, folded);
        }
    }

    /// Looks where the equations mirror as they are now.
    fn find_mirror(&mut self) {
        let found = [[true, true], [true, false], [false, true]]
            .into_iter()
            .filter_map(|across| Mirror::of(self.operator.plan(), across))
            .find(|mirror| mirror.holds(&self.operator, &self.load));
        if self.folded.as_ref().map(|(mirror, _)| mirror) != found.as_ref() {
            self.multigrid = None;
            self.folded = found.map(|mirror| {
                let folded = mirror.folded(&self.operator);
                (mirror, folded)
            });
        }
    }

    /// Makes the cycle that guides the solution, or takes the present ties over into it.
    fn guide(&mut self) -> Result<(), Failure> {
        let solved = match &self.folded {
            Some((_, folded)) => folded,
            None => &self.operator,
        };
        let guided = match &mut self.multigrid {
            Some(multigrid) => multigrid.renew(solved, Factor::Renewed),
            none => Multigrid::new(solved, Coarsening::FULL).map(|new| *none = Some(new)),
        };
        guided.map_err(|_| stopped(0, 1.0))
    }

    /// One solution by conjugate gradients from the present temperatures; `share` is what may be left
    /// of the load.
    fn relax(&mut self, tolerance: f64, share: f64) -> Result<Solved, Stalled> {
        let Some(multigrid) = &mut self.multigrid else {
            return Err(Stalled {
                iterations: 0,
                residual: f64::NAN,
            });
        };
        let effort = |operator: &Operator<Scalar>, load: &[f64]| Effort {
            tolerance,
            energy: None,
            reference: Some(share * operator.dot(load, load).sqrt()),
            most: MOST,
        };
        let Some((mirror, folded)) = &self.folded else {
            let effort = effort(&self.operator, &self.load);
            let given = (&self.load[..], &mut self.rise[..]);
            return conjugate_gradients(&self.operator, multigrid, given, &effort);
        };
        let stride = self.rise.len() / self.operator.plan().columns();
        let load = mirror.folded_load(&self.load, stride);
        let mut rise = mirror.kept_vector(&self.rise, stride);
        let effort = effort(folded, &load);
        let solved = conjugate_gradients(folded, multigrid, (&load, &mut rise), &effort);
        self.rise = mirror.spread_vector(&rise, stride);
        solved
    }

    /// Solves from the last temperatures until source and sink agree.
    pub(super) fn solve(&mut self) -> Result<Health, Failure> {
        let unit = self.gripped.unwrap_or(1.0).recip();
        let mut health = Health {
            iterations: 0,
            residual: f64::INFINITY,
            balance: f64::INFINITY,
            unknowns: self.operator.unknowns(),
        };
        let mut tolerance = self.tolerance;
        let balanced = (BALANCE * (self.tolerance / TOLERANCE).max(1.0)).min(LOST);
        if self.multigrid.is_none() {
            self.find_mirror();
            self.guide()?;
        }
        for _ in 0..ROUNDS {
            // A held source loads the equations with far more than passes through them: what
            // passes is the measure. It is known after the first round.
            let heat = if self.gripped.is_some() && health.iterations > 0 {
                self.heat()
            } else {
                self.gripped.map_or(1.0, |grip| 1e-3 * grip)
            };
            let solved = self.relax(tolerance, unit * heat);
            let done = health.iterations;
            let (iterations, residual, stalled) = match solved {
                Ok(solved) => (solved.iterations, solved.residual, false),
                Err(stalled) => (stalled.iterations, stalled.residual, true),
            };
            health.iterations = done + iterations;
            health.residual = residual;
            health.balance = ((self.drained() - self.heat()) / self.heat()).abs();
            if stalled && !(health.balance < LOST && tolerance < self.tolerance) {
                return Err(stopped(health.iterations, residual));
            }
            let settled = self.gripped.is_none() || done > 0;
            if stalled || settled && health.balance <= balanced {
                break;
            }
            if settled {
                tolerance *= 0.1;
            }
        }
        if health.balance.is_nan() || health.balance > LOST {
            return Err(stopped(health.iterations, health.balance));
        }
        Ok(health)
    }

    /// Heat that enters, W.
    pub(super) fn heat(&self) -> f64 {
        self.gripped
            .map_or(1.0, |grip| grip * (1.0 - self.source_mean()))
    }

    /// Heat that leaves, W.
    fn drained(&self) -> f64 {
        let flows = self
            .drains
            .iter()
            .map(|(place, pull)| pull * self.rise[*place]);
        flows.sum()
    }

    /// Mean over the heated zones, weighted with their heat.
    pub(super) fn source_mean(&self) -> f64 {
        let parts = self.zones.iter().zip(self.zone_means());
        parts.map(|((_, share), mean)| share * mean).sum()
    }

    /// Mean over every heated zone.
    pub(super) fn zone_means(&self) -> Vec<f64> {
        let mean = |zone: &Vec<(usize, f64)>| -> f64 {
            zone.iter()
                .map(|(place, weight)| weight * self.rise[*place])
                .sum()
        };
        self.zones.iter().map(|(zone, _)| mean(zone)).collect()
    }

    /// Mean over the sinks, weighted with what they conduct.
    pub(super) fn sink_mean(&self) -> f64 {
        self.drained() / self.drains.iter().map(|(_, pull)| pull).sum::<f64>()
    }
}

fn stopped(rounds: usize, residual: f64) -> Failure {
    Failure::NotSolved {
        solver: SOLVER,
        rounds,
        residual,
    }
}

/// Groups of unknowns; group and lowest node of every body.
fn arranged(stack: &Stack, arrangement: Arrangement) -> (Vec<usize>, Vec<[usize; 2]>) {
    let nodes = stack.bodies.iter().map(super::Body::nodes);
    match arrangement {
        Arrangement::Apart => (
            nodes.collect(),
            (0..stack.bodies.len()).map(|body| [body, 0]).collect(),
        ),
        Arrangement::Merged => {
            let mut foot = 0;
            let mut places: Vec<[usize; 2]> = nodes
                .rev()
                .map(|count| {
                    foot += count - 1;
                    [0, foot + 1 - count]
                })
                .collect();
            places.reverse();
            (vec![foot + 1], places)
        }
    }
}

/// For guidance, a trifle at every column of every part of an interface, W/K.
fn threads(stack: &Stack, conductivity: &[Conductivity]) -> Vec<Vec<Vec<f64>>> {
    let through = stack
        .bodies
        .iter()
        .zip(conductivity)
        .map(|(body, conductivity)| conductivity.through / body.thickness())
        .fold(f64::INFINITY, f64::min);
    let scaled = |weights: &Vec<f64>| weights.iter().map(|w| THREAD * through * w).collect();
    let of = |parts: &Vec<super::Meeting>| parts.iter().map(|part| scaled(&part.weights)).collect();
    stack.faces.iter().map(of).collect()
}

fn add_faces(
    stack: &Stack,
    places: &[[usize; 2]],
    threads: &[Vec<Vec<f64>>],
    operator: &mut Operator<Scalar>,
) -> Vec<Vec<usize>> {
    let unknown = |operator: &Operator<Scalar>, body: usize, node: usize| {
        operator.unknown(places[body][0], 0, places[body][1] + node)
    };
    let mut ties = Vec::new();
    for (interface, parts) in stack.faces.iter().enumerate() {
        let mut own = Vec::new();
        for (part, threads) in parts.iter().zip(&threads[interface]) {
            own.push(operator.add_tie(Tie {
                plus: unknown(operator, interface, part.upper),
                minus: Some(unknown(operator, interface + 1, part.lower)),
                stencil: lumped(threads),
            }));
        }
        ties.push(own);
    }
    ties
}
