//! The uncertain inputs of a joint: which there are, how they lie, what can be done about each.

use std::sync::Arc;

use crate::{
    estimate::{Chain, Realisation},
    joint::{Bounds, Finish, Friction, Joint, Tightening, TorqueTightening, What},
    numerics::distribution::deviations,
};

/// Puts an input at a quantile, 0 to 1.
type Placing = Arc<dyn Fn(&mut Realisation, f64) + Send + Sync>;
/// Reads where an input lies.
type Reading = Arc<dyn Fn(&Realisation) -> f64 + Send + Sync>;

/// One uncertain input.
///
/// Inputs of one name, such as the friction of every bolt, are one matter to the reader.
#[derive(Clone)]
pub struct Input {
    /// Name for people.
    pub name: &'static str,
    /// What the engineer can do about it.
    pub remedy: &'static str,
    /// Puts the input at a quantile, 0 to 1.
    pub place: Placing,
    /// Where the input lies in a realisation, for its share of the spread.
    pub reading: Reading,
    /// Quantiles at which it stands in a worst case: its ends, or three standard deviations.
    pub ends: [f64; 2],
    /// What it moves.
    pub moves: Moves,
}

/// What an input moves.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Moves {
    /// The clamp force, which rises with its quantile.
    MoreForce,
    /// The clamp force, which falls with its quantile.
    LessForce,
    /// Anything else.
    Other,
}

/// Quantile of three standard deviations below the median, Φ(−3): where an input without ends
/// stands in a worst case.
const THREE_SIGMA: f64 = 0.001_349_898_031_630_094_5;

/// Evenly between the bounds: −1 at the quantile 0, +1 at the quantile 1.
fn even(quantile: f64) -> f64 {
    2.0 * quantile - 1.0
}

/// A known input.
struct Known {
    name: &'static str,
    remedy: &'static str,
    place: fn(&mut Realisation, f64),
    reading: fn(&Realisation) -> f64,
}

impl Known {
    /// An input between ends.
    fn bounded(&self, moves: Moves) -> Input {
        Input {
            name: self.name,
            remedy: self.remedy,
            place: Arc::new(self.place),
            reading: Arc::new(self.reading),
            ends: [0.0, 1.0],
            moves,
        }
    }

    /// An input whose logarithm is normal.
    fn normal(&self) -> Input {
        let reading = self.reading;
        Input {
            reading: Arc::new(move |at| deviations(reading(at))),
            ends: [THREE_SIGMA, 1.0 - THREE_SIGMA],
            ..self.bounded(Moves::Other)
        }
    }
}

const FRICTION: Known = Known {
    name: "friction",
    remedy: "measure friction of the actual lubricant and lot, or tighten by a method that bypasses it",
    place: |at, u| at.friction = even(u),
    reading: |at| at.friction,
};
const TOOL: Known = Known {
    name: "torque tool",
    remedy: "use a calibrated tool of a closer class",
    place: |at, u| at.tool = even(u),
    reading: |at| at.tool,
};
const PRELOAD: Known = Known {
    name: "preload scatter",
    remedy: "measure the bolt's elongation, or use an instrumented bolt",
    place: |at, u| at.preload = even(u),
    reading: |at| at.preload,
};
const AXIAL: Known = Known {
    name: "load along the bolts",
    remedy: "narrow the range of the load, or hold it by stops and pins",
    place: |at, u| at.load = even(u),
    reading: |at| at.load,
};
const LOSS: Known = Known {
    name: "settling and relaxation",
    remedy: "re-tighten after settling, lengthen the grip, spare soft layers under the head",
    place: |at, u| at.loss = u,
    reading: |at| at.loss,
};
const ROUGHNESS: [Known; 2] = [
    Known {
        name: "roughness of the warm face",
        remedy: "measure Rq of the warm face",
        place: |at, u| at.roughness[0] = even(u),
        reading: |at| at.roughness[0],
    },
    Known {
        name: "roughness of the cold face",
        remedy: "measure Rq of the cold face",
        place: |at, u| at.roughness[1] = even(u),
        reading: |at| at.roughness[1],
    },
];
const SLOPE: [Known; 2] = [
    Known {
        name: "asperity slope of the warm face",
        remedy: "measure the rms slope of the warm face",
        place: |at, u| at.slope[0] = even(u),
        reading: |at| at.slope[0],
    },
    Known {
        name: "asperity slope of the cold face",
        remedy: "measure the rms slope of the cold face",
        place: |at, u| at.slope[1] = even(u),
        reading: |at| at.slope[1],
    },
];
const HARDNESS: Known = Known {
    name: "hardness of the faces",
    remedy: "measure the micro-hardness of the softer face",
    place: |at, u| at.hardness = even(u),
    reading: |at| at.hardness,
};
const CONDUCTIVITY: [Known; 2] = [
    Known {
        name: "conductivity of the warm plate",
        remedy: "measure the conductivity (or the electrical conductivity) of the warm plate's lot",
        place: |at, u| at.conductivity[0] = even(u),
        reading: |at| at.conductivity[0],
    },
    Known {
        name: "conductivity of the cold plate",
        remedy: "measure the conductivity (or the electrical conductivity) of the cold plate's lot",
        place: |at, u| at.conductivity[1] = even(u),
        reading: |at| at.conductivity[1],
    },
];
const CONDUCTIVITY_BETWEEN: Known = Known {
    name: "conductivity of the plates between",
    remedy: "measure the conductivity (or the electrical conductivity) of their lots",
    place: |at, u| at.conductivity_between = even(u),
    reading: |at| at.conductivity_between,
};
const LAW: Known = Known {
    name: "law of the solid spots",
    remedy: "measure the joint, and state the points under [measured]",
    place: |at, u| at.law = even(u),
    reading: |at| at.law,
};
const MEASURED: Known = Known {
    name: "own measurements",
    remedy: "repeat the measurement on more specimens",
    place: |at, u| at.law = even(u),
    reading: |at| at.law,
};
const FILLER: Known = Known {
    name: "filler",
    remedy: "measure the bond line and the filler's resistance, state its table",
    place: |at, u| at.filler = even(u),
    reading: |at| at.filler,
};
const GAS: Known = Known {
    name: "gas in the gaps",
    remedy: "measure in the gas and at the pressure of service",
    place: |at, u| at.gas = even(u),
    reading: |at| at.gas,
};
const FIELD: Known = Known {
    name: "pressure field and spreading model",
    remedy: "solve the contact and the conduction instead of the cone",
    place: |at, u| at.field = even(u),
    reading: |at| at.field,
};
/// Name of the input that stands for the way faces are bent, and how much.
pub const BENDING: &str = "flatness, convex or concave";

const FLATNESS: Known = Known {
    name: BENDING,
    remedy: "measure the faces and state bow or flatness_map, or call out a closer flatness",
    place: |at, u| at.flatness = even(u),
    reading: |at| at.flatness,
};
const FORM: Known = Known {
    name: "rigid head, stuck faces, asperity give",
    remedy: "measure the joint: the opposite choices of [contact] bound what is not known of them",
    place: |at, u| at.field = even(u),
    reading: |at| at.field,
};

const RUNNING: Known = Known {
    name: "running torque",
    remedy: "measure the running torque of every locking feature, and add it to the torque",
    place: |at, u| at.running = even(u),
    reading: |at| at.running,
};
const SETTLING: Known = Known {
    name: "settling",
    remedy: "re-tighten after settling, lengthen the grip, spare soft layers under the head",
    place: |at, u| at.settling = even(u),
    reading: |at| at.settling,
};
const RELAXATION: Known = Known {
    name: "short-term relaxation",
    remedy: "re-tighten after settling, or measure the force some hours later",
    place: |at, u| at.relaxation = even(u),
    reading: |at| at.relaxation,
};
const LONG_TERM: Known = Known {
    name: "relaxation in service",
    remedy: "lower the stress or the temperature of bolt and seats, or test over time",
    place: |at, u| at.long_term = even(u),
    reading: |at| at.long_term,
};

/// What a bolt has for itself.
fn own(bolt: usize, count: usize) -> Input {
    Input {
        name: "scatter from bolt to bolt",
        remedy: "tighten by a method of less scatter; more bolts average it out",
        place: Arc::new(move |at, u| *slot(&mut at.bolts, (bolt, count)) = even(u)),
        reading: Arc::new(move |at| at.bolts.get(bolt).copied().unwrap_or(0.0)),
        ends: [0.0, 1.0],
        moves: Moves::MoreForce,
    }
}

/// Name and remedy of a plate's input: of the first plate, the last and those between.
fn of_plate(
    joint: &Joint,
    plate: usize,
    told: [(&'static str, &'static str); 3],
) -> (&'static str, &'static str) {
    match plate {
        0 => told[0],
        _ if plate + 1 == joint.plates.len() => told[1],
        _ => told[2],
    }
}

/// A value that the file states with a spread.
fn stated(joint: &Joint, index: usize) -> Input {
    let (what, count) = (joint.uncertain[index].what, joint.uncertain.len());
    let (name, remedy) = match what {
        What::FillerConductivity(_) => (
            "conductivity of the filler",
            "measure the filler at the pressure and temperature of service",
        ),
        What::FillerThickness(_) => (
            "thickness of the filler",
            "measure the bond line, or set it by spacers",
        ),
        What::FillerBoundary(_) => (
            "boundaries of the filler",
            "measure the filler between faces of this finish at two thicknesses",
        ),
        What::FillerThinnest(_) => (
            "thinnest bond line",
            "ask the maker for the largest particle, or measure the bond line",
        ),
        What::Emissivity(_) => ("emissivity", "measure the emissivity of the faces"),
        What::Thickness(plate) => of_plate(
            joint,
            plate,
            [
                (
                    "thickness of the warm plate",
                    "measure the warm plate, or call out a closer tolerance",
                ),
                (
                    "thickness of the cold plate",
                    "measure the cold plate, or call out a closer tolerance",
                ),
                (
                    "thickness of the plates between",
                    "measure the plates between, or call out closer tolerances",
                ),
            ],
        ),
        What::Bow(plate) => of_plate(
            joint,
            plate,
            [
                (
                    "bow of the warm plate",
                    "measure the warm face, and state a flatness_map",
                ),
                (
                    "bow of the cold plate",
                    "measure the cold face, and state a flatness_map",
                ),
                (
                    "bow of the plates between",
                    "measure the plates between, and state a flatness_map",
                ),
            ],
        ),
        What::Flatness(plate, _) => of_plate(
            joint,
            plate,
            [
                (
                    "height of flatness, warm face",
                    "measure the warm face, or call out a closer flatness",
                ),
                (
                    "height of flatness, cold face",
                    "measure the cold face, or call out a closer flatness",
                ),
                (
                    "height of flatness, plates between",
                    "measure the plates between, or call out a closer flatness",
                ),
            ],
        ),
        What::Film(_) => (
            "film of the sink",
            "measure the film on a heated dummy in the flow of service, or hold the flow closer",
        ),
        What::Heat => (
            HEAT,
            "measure the heat, or state the range of service more closely",
        ),
        What::GasPressure => (
            "pressure of the gas",
            "measure or hold the pressure of service",
        ),
    };
    Input {
        name,
        remedy,
        place: Arc::new(move |at, u| *slot(&mut at.stated, (index, count)) = even(u)),
        reading: Arc::new(move |at| at.stated.get(index).copied().unwrap_or(0.0)),
        ends: [0.0, 1.0],
        moves: Moves::Other,
    }
}

/// Name of the input that stands for a heat stated with a spread.
pub const HEAT: &str = "heat";
/// Name of the input that stands for the error of the grid.
pub const NUMERICAL: &str = "numerical error";

/// What the grid may err, either way.
fn numerical(error: f64) -> Input {
    Input {
        name: NUMERICAL,
        remedy: "solve finer: `--resolution fine`",
        place: Arc::new(move |at, u| at.numerical = error * even(u)),
        reading: Arc::new(|at| at.numerical),
        ends: [0.0, 1.0],
        moves: Moves::Other,
    }
}

/// A place in a list that is nominal where it has not been filled.
fn slot(list: &mut Vec<f64>, (index, count): (usize, usize)) -> &mut f64 {
    list.resize(count, 0.0);
    &mut list[index]
}

/// The inputs that can move this joint, in the order in which force and heat flow.
pub fn inputs(chain: &Chain) -> Vec<Input> {
    let joint = chain.joint();
    let mut found = forces(chain);
    if joint.measured.is_some() {
        found.push(MEASURED.normal());
    }
    let interfaces = 0..joint.interfaces();
    let bare: Vec<usize> = interfaces.filter(|at| joint.is_bare(*at)).collect();
    if !bare.is_empty() {
        for side in [0, 1] {
            let any = |holds: fn(&Finish) -> bool| {
                bare.iter()
                    .any(|interface| holds(joint.finishes(*interface)[side]))
            };
            if any(|finish| finish.roughness.is_spread()) {
                found.push(ROUGHNESS[side].bounded(Moves::Other));
            }
            if any(Finish::slope_scatters) {
                found.push(SLOPE[side].normal());
            }
        }
        found.push(HARDNESS.bounded(Moves::Other));
        if joint.contact.law_factor > 1.0 {
            found.push(LAW.normal());
        }
    }
    if joint.every_filler().any(|filler| filler.factor > 1.0) {
        found.push(FILLER.normal());
    }
    let in_gas = joint.gas_conducts();
    if in_gas {
        found.push(GAS.normal());
    }
    found.extend(CONDUCTIVITY.iter().map(|known| known.bounded(Moves::Other)));
    if joint.plates.len() > 2 {
        found.push(CONDUCTIVITY_BETWEEN.bounded(Moves::Other));
    }
    if chain.knows_the_gap() {
        if joint.most_loose_flatness() > 0.0 {
            found.push(FLATNESS.bounded(Moves::Other));
        }
        found.push(FORM.bounded(Moves::Other));
    } else {
        found.push(FIELD.bounded(Moves::Other));
    }
    let moves = |index: &usize| joint.uncertain[*index].what != What::GasPressure || in_gas;
    let numbers = (0..joint.uncertain.len()).filter(moves);
    found.extend(numbers.map(|index| stated(joint, index)));
    if let Some(error) = chain.known_error().filter(|error| *error > 0.0) {
        found.push(numerical(error));
    }
    found
}

/// The inputs that move the clamp force.
fn forces(chain: &Chain) -> Vec<Input> {
    let joint = chain.joint();
    let mut found = Vec::new();
    let torques: Vec<&TorqueTightening> = joint
        .fasteners
        .iter()
        .filter_map(|group| match &group.tightening {
            Tightening::Torque(torque) => Some(torque),
            Tightening::Preload(_) => None,
        })
        .collect();
    let by_friction = torques.iter().any(|torque| {
        torque.scatter.is_none()
            && match torque.friction {
                Friction::Coefficients { thread, head } => thread.is_spread() || head.is_spread(),
                Friction::NutFactor(factor) => factor.is_spread(),
            }
    });
    let by_tool = torques
        .iter()
        .any(|torque| torque.scatter.is_none() && torque.tolerance > 0.0);
    let by_method = torques.iter().any(|torque| torque.scatter.is_some())
        || joint.fasteners.iter().any(
            |group| matches!(&group.tightening, Tightening::Preload(force) if force.is_spread()),
        );
    let share = joint.bolts_scatter.own;
    let of_lot = share < 1.0;
    if by_friction && of_lot {
        found.push(FRICTION.bounded(Moves::LessForce));
    }
    if by_tool {
        found.push(TOOL.bounded(Moves::MoreForce));
    }
    if by_method && of_lot {
        found.push(PRELOAD.bounded(Moves::MoreForce));
    }
    if share > 0.0 && (by_friction || by_method) {
        let count = joint.bolts().count();
        found.extend((0..count).map(|bolt| own(bolt, count)));
    }
    if torques.iter().any(|torque| torque.running_spread.is_some()) {
        found.push(RUNNING.bounded(Moves::LessForce));
    }
    let loaded = joint.fasteners.iter().any(|group| {
        let lasting = group.axial_load.as_ref().filter(|load| load.lasting);
        lasting.is_some_and(|load| {
            let mut cases = joint.service.cases.iter();
            cases.any(|case| load.in_case(case.name).is_spread())
        })
    });
    if loaded {
        found.push(AXIAL.bounded(Moves::LessForce));
    }
    match joint.losses {
        None => found.push(LOSS.bounded(Moves::LessForce)),
        Some(losses) => {
            let mut loses = |bounds: Bounds, known: &Known| {
                if bounds.is_spread() {
                    found.push(known.bounded(Moves::LessForce));
                }
            };
            losses
                .settling
                .into_iter()
                .for_each(|settling| loses(settling, &SETTLING));
            loses(losses.relaxation, &RELAXATION);
            loses(losses.long_term, &LONG_TERM);
        }
    }
    found
}
