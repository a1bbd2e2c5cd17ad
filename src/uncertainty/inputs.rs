//! The uncertain inputs of a joint: which there are, how they lie, what can be done about each.

use crate::{
    estimate::{Chain, Realisation},
    joint::{Finish, Friction, Medium, Tightening},
    numerics::special::normal_quantile,
};

/// One uncertain input.
#[derive(Clone, Copy)]
pub struct Input {
    /// Name for people.
    pub name: &'static str,
    /// What the engineer can do about it.
    pub remedy: &'static str,
    /// Puts the input at a quantile, 0 to 1.
    pub place: fn(&mut Realisation, f64),
    /// Where the input lies in a realisation, for its share of the spread.
    pub reading: fn(&Realisation) -> f64,
}

/// Evenly between the bounds: −1 at the quantile 0, +1 at the quantile 1.
///
/// A range says where a value may lie and no more; even weight is the widest reading of it.
fn even(quantile: f64) -> f64 {
    2.0 * quantile - 1.0
}

const FRICTION: Input = Input {
    name: "friction",
    remedy: "measure friction of the actual lubricant and lot, or tighten by a method that bypasses it",
    place: |at, u| at.friction = even(u),
    reading: |at| at.friction,
};
const TOOL: Input = Input {
    name: "torque tool",
    remedy: "use a calibrated tool of a closer class",
    place: |at, u| at.tool = even(u),
    reading: |at| at.tool,
};
const PRELOAD: Input = Input {
    name: "preload scatter",
    remedy: "measure the bolt's elongation, or use an instrumented bolt",
    place: |at, u| at.preload = even(u),
    reading: |at| at.preload,
};
const AXIAL: Input = Input {
    name: "load along the bolts",
    remedy: "narrow the range of the load, or hold it by stops and pins",
    place: |at, u| at.load = even(u),
    reading: |at| at.load,
};
const LOSS: Input = Input {
    name: "settling and relaxation",
    remedy: "re-tighten after settling, lengthen the grip, spare soft layers under the head",
    place: |at, u| at.loss = u,
    reading: |at| at.loss,
};
const ROUGHNESS: [Input; 2] = [
    Input {
        name: "roughness of the warm face",
        remedy: "measure Rq of the warm face",
        place: |at, u| at.roughness[0] = even(u),
        reading: |at| at.roughness[0],
    },
    Input {
        name: "roughness of the cold face",
        remedy: "measure Rq of the cold face",
        place: |at, u| at.roughness[1] = even(u),
        reading: |at| at.roughness[1],
    },
];
const SLOPE: [Input; 2] = [
    Input {
        name: "asperity slope of the warm face",
        remedy: "measure the rms slope of the warm face",
        place: |at, u| at.slope[0] = normal_quantile(u),
        reading: |at| at.slope[0],
    },
    Input {
        name: "asperity slope of the cold face",
        remedy: "measure the rms slope of the cold face",
        place: |at, u| at.slope[1] = normal_quantile(u),
        reading: |at| at.slope[1],
    },
];
const HARDNESS: Input = Input {
    name: "hardness of the faces",
    remedy: "measure the micro-hardness of the softer face",
    place: |at, u| at.hardness = even(u),
    reading: |at| at.hardness,
};
const CONDUCTIVITY: [Input; 2] = [
    Input {
        name: "conductivity of the warm plate",
        remedy: "measure the conductivity (or the electrical conductivity) of the warm plate's lot",
        place: |at, u| at.conductivity[0] = even(u),
        reading: |at| at.conductivity[0],
    },
    Input {
        name: "conductivity of the cold plate",
        remedy: "measure the conductivity (or the electrical conductivity) of the cold plate's lot",
        place: |at, u| at.conductivity[1] = even(u),
        reading: |at| at.conductivity[1],
    },
];
const CONDUCTIVITY_BETWEEN: Input = Input {
    name: "conductivity of the plates between",
    remedy: "measure the conductivity (or the electrical conductivity) of their lots",
    place: |at, u| at.conductivity_between = even(u),
    reading: |at| at.conductivity_between,
};
const LAW: Input = Input {
    name: "law of the solid spots",
    remedy: "measure the joint, and state the points under [measured]",
    place: |at, u| at.law = normal_quantile(u),
    reading: |at| at.law,
};
const MEASURED: Input = Input {
    name: "own measurements",
    remedy: "repeat the measurement on more specimens",
    place: |at, u| at.law = normal_quantile(u),
    reading: |at| at.law,
};
const FILLER: Input = Input {
    name: "filler",
    remedy: "measure the bond line and the filler's resistance, state its table",
    place: |at, u| at.filler = normal_quantile(u),
    reading: |at| at.filler,
};
const GAS: Input = Input {
    name: "gas in the gaps",
    remedy: "measure in the gas and at the pressure of service",
    place: |at, u| at.gas = normal_quantile(u),
    reading: |at| at.gas,
};
const FIELD: Input = Input {
    name: "pressure field and spreading model",
    remedy: "solve the contact and the conduction instead of the cone",
    place: |at, u| at.field = even(u),
    reading: |at| at.field,
};
const FLATNESS: Input = Input {
    name: "flatness, convex or concave",
    remedy: "measure the faces and state bow or flatness_map, or call out a closer flatness",
    place: |at, u| at.flatness = even(u),
    reading: |at| at.flatness,
};
const FORM: Input = Input {
    name: "rigid head, stuck faces, asperity give",
    remedy: "measure the joint: the opposite choices of [contact] bound what is not known of them",
    place: |at, u| at.field = even(u),
    reading: |at| at.field,
};

/// The inputs that can move this joint, in the order in which force and heat flow.
pub fn inputs(chain: &Chain) -> Vec<Input> {
    let joint = chain.joint();
    let mut found = Vec::new();
    let torque = joint
        .fasteners
        .iter()
        .filter_map(|group| match &group.tightening {
            Tightening::Torque(torque) => Some(torque),
            Tightening::Preload(_) => None,
        });
    let by_friction = torque.clone().any(|torque| {
        torque.scatter.is_none()
            && match torque.friction {
                Friction::Coefficients { thread, head } => spread(&thread) || spread(&head),
                Friction::NutFactor(factor) => spread(&factor),
            }
    });
    let by_tool = torque
        .clone()
        .any(|torque| torque.scatter.is_none() && torque.tolerance > 0.0);
    let by_method = torque.clone().any(|torque| torque.scatter.is_some())
        || joint
            .fasteners
            .iter()
            .any(|group| matches!(&group.tightening, Tightening::Preload(force) if spread(force)));
    if by_friction {
        found.push(FRICTION);
    }
    if by_tool {
        found.push(TOOL);
    }
    if by_method {
        found.push(PRELOAD);
    }
    let loaded = joint.fasteners.iter().any(|group| {
        let lasting = group.axial_load.as_ref().filter(|load| load.lasting);
        lasting.is_some_and(|load| {
            let mut cases = joint.service.cases.iter();
            cases.any(|case| spread(&load.in_case(case.name)))
        })
    });
    if loaded {
        found.push(AXIAL);
    }
    if joint.losses.is_none() {
        found.push(LOSS);
    }
    if joint.measured.is_some() {
        found.push(MEASURED);
    }
    let interfaces = 0..joint.interfaces();
    let bare: Vec<usize> = interfaces.filter(|at| joint.is_bare(*at)).collect();
    if !bare.is_empty() {
        for side in [0, 1] {
            let any = |holds: fn(&Finish) -> bool| {
                bare.iter()
                    .any(|interface| holds(joint.finishes(*interface)[side]))
            };
            if any(|finish| spread(&finish.roughness)) {
                found.push(ROUGHNESS[side]);
            }
            if any(|finish| finish.slope_factor > 1.0) {
                found.push(SLOPE[side]);
            }
        }
        found.push(HARDNESS);
        found.push(LAW);
    }
    if joint.every_filler().any(|filler| filler.factor > 1.0) {
        found.push(FILLER);
    }
    let open = (0..joint.interfaces()).any(|interface| joint.filler(interface).is_none());
    if open && matches!(joint.service.medium, Medium::Gas { .. }) {
        found.push(GAS);
    }
    found.extend(CONDUCTIVITY);
    if joint.plates.len() > 2 {
        found.push(CONDUCTIVITY_BETWEEN);
    }
    if chain.knows_the_gap() {
        if joint.most_loose_flatness() > 0.0 {
            found.push(FLATNESS);
        }
        found.push(FORM);
    } else {
        found.push(FIELD);
    }
    found
}

fn spread(bounds: &crate::joint::Bounds) -> bool {
    bounds.low < bounds.high
}
