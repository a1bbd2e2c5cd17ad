//! How the resistances answer to force, faces and conductivities: surfaces for the draws.

use serde_json::{Value, json};

use crate::{
    estimate::chain::{
        conditions::Conditions,
        elastic::solver::{Depth, Met, variable},
    },
    numerics::surface::{Surface, design},
    resistance::Path,
};

/// Number of variables: force, contact, gap, conductivity of the first plate, of the last, and of
/// those between; two plates have no last variable.
const VARIABLES: usize = 6;
/// Half width of the design along contact, gap and the conductivities, as logarithms of the ratio
/// to nominal.
///
/// About where the draws lie: surfaces and laws move the contact by half, gas and roughness the gap
/// by a fourth, conductivities by a few hundredths.
static STEPS: [f64; VARIABLES - 1] = [0.6, 0.25, 0.06, 0.06, 0.06];
/// Widest step between two forces that are solved, as a logarithm of their ratio.
const FORCE_STEP: f64 = 0.6;
/// Narrowest reach to either side of the nominal force, likewise.
const LEAST_REACH: f64 = 0.1;
/// Least force that is solved, over the nominal: below it the answer is that of this force as long
/// as any is left.
pub(in crate::estimate::chain) const LEAST_FORCE: f64 = 0.02;
/// Places at which the surfaces are held against direct solutions: force between the ends of its
/// range, the others in half widths of the design.
const PROBES: [[f64; VARIABLES]; 4] = [
    [0.8, -0.6, 0.5, -0.8, 0.8, -0.7],
    [0.15, 0.7, -0.6, 0.5, -0.7, 0.6],
    [0.35, -0.8, 0.7, 0.7, 0.6, 0.8],
    [0.6, 0.5, -0.7, -0.6, -0.5, -0.6],
];

/// Departure of a state from the nominal one: logarithms of ratios; the force is −∞ where none is
/// left.
pub(super) type Departure = [f64; VARIABLES];
/// The departure of the nominal state.
pub(super) const NOMINAL: Departure = [0.0; VARIABLES];

/// Half widths of the design of a joint of so many plates.
pub(super) fn steps(plates: usize) -> &'static [f64] {
    if plates > 2 {
        &STEPS
    } else {
        &STEPS[..STEPS.len() - 1]
    }
}

/// What stands for the faces in a departure: conductance at one pressure and at one gap.
///
/// A departure has one number for the contact of all interfaces: the mean of the logarithms of their
/// ratios, weighted by what each has in the resistance. To first order that moves the resistance as
/// the interfaces would one by one. The plates between the first and the last have one number as
/// well, a plain mean.
#[derive(Clone, Debug)]
pub(super) struct Gauge {
    force: f64,
    faces: Vec<FaceGauge>,
    conductivity: Vec<f64>,
}

/// An interface in the nominal state, with its conductance where it touches and where it is parted.
#[derive(Clone, Copy, Debug)]
struct FaceGauge {
    met: Met,
    touching: f64,
    parted: f64,
}

impl Gauge {
    /// Reads the nominal conditions.
    pub(super) fn of(conditions: &Conditions, met: &[Met]) -> Self {
        let faces = conditions
            .faces
            .iter()
            .zip(met)
            .map(|(faces, met)| FaceGauge {
                met: *met,
                touching: faces.conductance(met.pressure),
                parted: faces.local.parted(met.gap),
            });
        Self {
            force: conditions.forces.iter().sum(),
            faces: faces.collect(),
            conductivity: conditions.conductivity.clone(),
        }
    }

    /// The nominal state as data.
    pub(super) fn tables(&self) -> Value {
        let faces = self.faces.iter();
        json!({
            "force": self.force,
            "conductivity": self.conductivity,
            "faces": faces.map(|face| json!({
                "pressure": face.met.pressure,
                "gap": face.met.gap,
                "shares": face.met.shares,
                "touching": face.touching,
                "parted": face.parted,
            })).collect::<Vec<Value>>(),
        })
    }

    /// Nominal force of all bolts, N.
    pub(super) fn force(&self) -> f64 {
        self.force
    }

    /// Where other conditions lie from the nominal ones.
    pub(super) fn departure(&self, conditions: &Conditions) -> Departure {
        let ratio = |value: f64, nominal: f64| {
            if nominal > 0.0 && value > 0.0 {
                (value / nominal).ln()
            } else {
                // Nothing crosses an open gap without gas and radiation, in no state.
                0.0
            }
        };
        let force: f64 = conditions.forces.iter().sum();
        let faces = || conditions.faces.iter().zip(&self.faces);
        let last = self.conductivity.len() - 1;
        let conductivity = |which: usize| {
            let plates = conditions.conductivity.iter().zip(&self.conductivity);
            let own = plates
                .enumerate()
                .filter(|(at, _)| variable(*at, last) == which);
            weighted(&own.map(|(_, (now, nominal))| (ratio(*now, *nominal), 1.0)))
        };
        [
            if force > 0.0 {
                (force / self.force).ln()
            } else {
                f64::NEG_INFINITY
            },
            weighted(&faces().map(|(faces, gauge)| {
                let now = faces.conductance(gauge.met.pressure);
                (ratio(now, gauge.touching), gauge.met.shares[0])
            })),
            weighted(&faces().map(|(faces, gauge)| {
                let now = faces.local.parted(gauge.met.gap);
                (ratio(now, gauge.parted), gauge.met.shares[1])
            })),
            conductivity(0),
            conductivity(1),
            conductivity(2),
        ]
    }
}

/// Weighted mean; a plain one where no weight is above zero, and 0 of nothing.
fn weighted(values: &(impl Iterator<Item = (f64, f64)> + Clone)) -> f64 {
    let mut alone = values.clone();
    match (alone.next(), alone.next()) {
        (None, _) => return 0.0,
        // A mean of one would round.
        (Some((only, _)), None) => return only,
        _ => {}
    }
    let sums = |plain: f64| {
        values
            .clone()
            .fold((0.0, 0.0), |(sum, weights), (value, weight)| {
                (sum + (weight + plain) * value, weights + weight + plain)
            })
    };
    let (sum, weights) = sums(0.0);
    if weights > 0.0 {
        sum / weights
    } else {
        let (sum, count) = sums(1.0);
        sum / count
    }
}

/// Readings of a path that go smoothly with the departure.
///
/// ```text
/// ln R for contact, perfect contact and what the joint adds;
/// node to node, interface and hottest as shares of source to sink
/// ```
///
/// What the joint adds is read as a logarithm where it is above zero in every solution, and as a
/// share of source to sink where it is nothing within rounding.
pub(in crate::estimate::chain) type Readings = [f64; 7];

/// The answers of one case over a range of force.
///
/// At every solved force a surface of second order over contact, gap and conductivities; its twists
/// are those of the nominal force. Between forces a parabola through the three nearest.
#[derive(Clone, Debug)]
pub(super) struct Response {
    /// Half widths of the design, one for each variable besides the force.
    pub(super) steps: &'static [f64],
    /// Logarithms of the force over the nominal one, rising.
    pub(super) forces: Vec<f64>,
    /// One for each force and reading.
    pub(super) surfaces: Vec<[Surface; 7]>,
    /// The path when no force is left and the faces only lie on each other; none where no draw
    /// comes to that.
    pub(super) open: Option<Path>,
    /// The nominal path on the level of the surfaces.
    pub(super) base: Path,
    /// Largest error of source to sink at the probes, relative.
    pub(super) error: f64,
}

impl Response {
    /// Solves the designs and the probes, and lays the surfaces through the former.
    ///
    /// `range` is the least and the largest force over the nominal, with the half widths of the
    /// design; `solve` finds the paths of many departures, each as deep as it says; `open` is the
    /// one without force.
    pub(super) fn through<E>(
        (range, steps): ([f64; 2], &'static [f64]),
        solve: impl Fn(&[(Departure, Depth)]) -> Result<Vec<Path>, E>,
        open: Option<Path>,
    ) -> Result<Self, E> {
        let forces = forces(range);
        let whole = design(steps);
        let alone = 1 + 2 * steps.len();
        let mut points: Vec<Departure> = Vec::new();
        for force in &forces {
            let nominal = *force == 0.0;
            let taken = if nominal { whole.len() } else { alone };
            points.extend(whole[..taken].iter().map(|rest| at(*force, rest)));
        }
        let solutions = points.len();
        let ends = [forces[0], forces[forces.len() - 1]];
        points.extend(PROBES.map(|[along, rest @ ..]| {
            let force = ends[0] + along * (ends[1] - ends[0]);
            let rest: Vec<f64> = rest
                .iter()
                .zip(steps)
                .map(|(part, step)| part * step)
                .collect();
            at(force, &rest)
        }));
        let asked: Vec<(Departure, Depth)> = points
            .iter()
            .enumerate()
            .map(|(place, departure)| {
                if place < solutions {
                    (*departure, depth(departure, ends))
                } else {
                    (*departure, Depth::SourceToSink)
                }
            })
            .collect();
        let paths = solve(&asked)?;
        let (designs, probes) = paths.split_at(solutions);
        let read: Vec<Readings> = designs.iter().map(readings).collect();
        let centre = solutions_at_nominal(&forces, alone);
        let mut response = Self {
            surfaces: surfaces((&forces, steps), &read),
            steps,
            forces,
            open,
            base: designs[centre].clone(),
            error: 0.0,
        };
        for (path, departure) in probes.iter().zip(&points[solutions..]) {
            let told = response.alone(departure);
            let off = (told.source_to_sink / path.source_to_sink - 1.0).abs();
            response.error = if off.is_nan() {
                off
            } else {
                response.error.max(off)
            };
        }
        Ok(response)
    }

    /// Whether a range of force over the nominal lies inside.
    pub(super) fn covers(&self, [low, high]: [f64; 2]) -> bool {
        const ROUNDING: f64 = 1e-9;
        let ends = [self.forces[0], self.forces[self.forces.len() - 1]];
        low.max(LEAST_FORCE).ln() >= ends[0] - ROUNDING && high.ln() <= ends[1] + ROUNDING
    }

    /// Whether conditions that lie there are near enough to have their draws read here: a draw goes
    /// as far again.
    ///
    /// Open gaps that carry next to nothing may conduct as they like.
    pub(super) fn holds(&self, departure: &Departure, gauge: &Gauge) -> bool {
        const NEXT_TO_NOTHING: f64 = 0.01;
        let shares = gauge
            .faces
            .iter()
            .fold([0.0; 2], |[touching, parted], face| {
                [touching + face.met.shares[0], parted + face.met.shares[1]]
            });
        let parted = shares[1] / (shares[0] + shares[1]);
        let rest = departure[1..].iter().zip(self.steps).enumerate();
        rest.into_iter().all(|(variable, (off, step))| {
            let weighed = if variable == 1 {
                off.abs() * parted
            } else {
                f64::INFINITY
            };
            off.abs() <= 0.5 * step || weighed <= NEXT_TO_NOTHING
        })
    }

    /// The path at a departure on the level of the surfaces themselves.
    pub(super) fn alone(&self, departure: &Departure) -> Path {
        self.applied(&self.base, (&NOMINAL, departure))
    }

    /// A path of a finer solution at one departure, moved to another as the surfaces say.
    pub(super) fn applied(&self, path: &Path, ends: (&Departure, &Departure)) -> Path {
        self.shifted(path, ends, &[0.0; 7])
    }

    /// The same with what the pattern of the forces adds to the readings.
    pub(super) fn shifted(
        &self,
        path: &Path,
        (from, to): (&Departure, &Departure),
        shift: &Readings,
    ) -> Path {
        if let (f64::NEG_INFINITY, Some(open)) = (to[0], &self.open) {
            return Path {
                coolant_drop: path.coolant_drop,
                ..moved(open, shift)
            };
        }
        let (there, here) = (self.at(to), self.at(from));
        let by = std::array::from_fn(|reading| there[reading] - here[reading] + shift[reading]);
        moved(path, &by)
    }

    /// Readings at a departure.
    pub(super) fn at(&self, departure: &Departure) -> Readings {
        let [force, rest @ ..] = departure;
        let rest = &rest[..self.steps.len()];
        let last = self.forces.len() - 1;
        let force = force.clamp(self.forces[0], self.forces[last]);
        let nearest = (0..=last)
            .min_by(|one, other| {
                let off = |index: &usize| (self.forces[*index] - force).abs();
                off(one).total_cmp(&off(other))
            })
            .unwrap_or(0);
        let first = nearest.clamp(1, last - 1) - 1;
        let nodes = &self.forces[first..first + 3];
        let mut read = [0.0; 7];
        for (place, node) in nodes.iter().enumerate() {
            let weight: f64 = nodes
                .iter()
                .enumerate()
                .filter(|(other, _)| *other != place)
                .map(|(_, other)| (force - other) / (node - other))
                .product();
            for (sum, surface) in read.iter_mut().zip(&self.surfaces[first + place]) {
                *sum += weight * surface.at(rest);
            }
        }
        read
    }
}

/// A path with its readings moved by so much.
pub(in crate::estimate::chain) fn moved(path: &Path, by: &Readings) -> Path {
    let [contact, perfect, added, node, interface, hottest, joint] = *by;
    let perfect_contact = path.perfect_contact * perfect.exp();
    let added_by_joint = if added.is_finite() {
        path.added_by_joint * added.exp()
    } else {
        let share = path.added_by_joint / path.source_to_sink + joint;
        perfect_contact * share / (1.0 - share)
    };
    let source_to_sink = perfect_contact + added_by_joint;
    let share = |value: f64, moved: f64| (value / path.source_to_sink + moved) * source_to_sink;
    Path {
        contact: path.contact * contact.exp(),
        perfect_contact,
        added_by_joint,
        source_to_sink,
        node_to_node: share(path.node_to_node, node),
        interface_drop: share(path.interface_drop, interface),
        hottest: share(path.hottest, hottest),
        ..path.clone()
    }
}

/// Solved forces of a range from the nominal one outwards.
pub(super) fn outwards(range: [f64; 2]) -> Vec<f64> {
    let mut found = forces(range);
    found.sort_by(|one, other| one.abs().total_cmp(&other.abs()));
    found
}

/// Least, nominal and largest of the solved forces of a range.
pub(super) fn ends(range: [f64; 2]) -> [f64; 3] {
    let found = forces(range);
    [found[0], 0.0, found[found.len() - 1]]
}

/// Forces at which the form, and flatness where it is loose, are bounded.
///
/// What heads, friction and asperities do falls as the force grows: the nominal force stands for all
/// above it, which is the wider side. Flatness is bounded at the ends and the nominal force, and at one
/// between the least and the nominal where these lie far apart, since it closes somewhere on the way.
pub(super) fn bounded(range: [f64; 2], loose: bool) -> Vec<f64> {
    /// A third of the nominal force.
    const FAR: f64 = -1.1;
    let [least, nominal, most] = ends(range);
    if loose && least < FAR {
        vec![least, 0.5 * least, nominal, most]
    } else if loose {
        vec![least, nominal, most]
    } else {
        vec![least, nominal]
    }
}

/// Solved are the middle of every design, all points along one variable at the nominal force and
/// those along the contact at both ends of the force; the heat of the others is between them.
fn depth([force, rest @ ..]: &Departure, ends: [f64; 2]) -> Depth {
    let moved = rest.iter().filter(|each| **each != 0.0).count();
    let contact_alone = moved == 1 && rest[0] != 0.0;
    match moved {
        0 => Depth::Solved,
        1 if *force == 0.0 => Depth::Solved,
        1 if contact_alone && ends.contains(force) => Depth::Solved,
        _ => Depth::Between,
    }
}

fn at(force: f64, rest: &[f64]) -> Departure {
    std::array::from_fn(|variable| match variable {
        0 => force,
        // Two plates have none between them.
        _ => rest.get(variable - 1).copied().unwrap_or(0.0),
    })
}

/// Forces to be solved: nominal, and evenly to both ends of the range.
fn forces([low, high]: [f64; 2]) -> Vec<f64> {
    let below = low.max(LEAST_FORCE).ln().min(-LEAST_REACH);
    let above = high.ln().max(LEAST_REACH);
    let even = |end: f64| {
        let count = (end.abs() / FORCE_STEP).ceil().max(1.0) as usize;
        (1..=count).map(move |step| end * step as f64 / count as f64)
    };
    let mut forces: Vec<f64> = even(below).collect();
    forces.reverse();
    forces.push(0.0);
    forces.extend(even(above));
    forces
}

/// Index of the nominal solution in designs of which all others have `alone` points.
fn solutions_at_nominal(forces: &[f64], alone: usize) -> usize {
    forces.iter().take_while(|force| **force < 0.0).count() * alone
}

/// Surfaces through readings that stand force by force.
fn surfaces((forces, steps): (&[f64], &[f64]), read: &[Readings]) -> Vec<[Surface; 7]> {
    let whole = design(steps).len();
    let alone = 1 + 2 * steps.len();
    let nominal = solutions_at_nominal(forces, alone);
    let through = |reading: usize, values: &[Readings]| {
        let values: Vec<f64> = values.iter().map(|values| values[reading]).collect();
        Surface::through(steps, &values)
    };
    let centre: [Surface; 7] =
        std::array::from_fn(|reading| through(reading, &read[nominal..nominal + whole]));
    let mut next = 0;
    forces
        .iter()
        .map(|force| {
            if *force == 0.0 {
                next += whole;
                return centre.clone();
            }
            let own = &read[next..next + alone];
            next += alone;
            std::array::from_fn(|reading| through(reading, own).with_twist_of(&centre[reading]))
        })
        .collect()
}

pub(in crate::estimate::chain) fn readings(path: &Path) -> Readings {
    let whole = path.source_to_sink;
    [
        path.contact.ln(),
        path.perfect_contact.ln(),
        // Not a number where nothing is added; the share at the end serves then.
        path.added_by_joint.ln(),
        path.node_to_node / whole,
        path.interface_drop / whole,
        path.hottest / whole,
        path.added_by_joint / whole,
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn forces_reach_both_ends_in_steps_and_hold_the_nominal() {
        let found = forces([0.1, 1.4]);
        assert!(found.contains(&0.0));
        assert!((found[0] - 0.1_f64.ln()).abs() < 1e-12);
        assert!(
            found
                .windows(2)
                .all(|pair| (0.0..=FORCE_STEP + 1e-12).contains(&(pair[1] - pair[0])))
        );
        assert!(forces([1.0, 1.0]).len() == 3);
        assert!((forces([0.0, 1.0])[0] - LEAST_FORCE.ln()).abs() < 1e-12);
    }
}
