//! The whole chain on one page: a joint, torque first, resistance last.

mod cautions;
mod chain;
mod choice;
mod forces;
mod loss;
mod maps;
mod requirement;
mod results;
mod surfaces;
mod temperatures;
mod torques;
mod window;

pub(crate) use chain::LARGE_ERROR;
pub use chain::{Bend, Chain, Conditions, DrawPlan, Drawn, ForceEnd, Meeting, State, Workspace};
pub use choice::{Choice, Fineness, Watch};
pub use forces::Strength;
pub use loss::{Loss, worst_loss};
pub use maps::{field_map, ring_tables};
pub use requirement::{Bent, Met, RequirementResult};
pub use results::*;
pub use temperatures::{
    FacePoint, HeatMap, OutlinePlate, SectionBolt, SectionPlate, Solid, StackOutline, StackSection,
    Temperatures, Through, heat_map, stack_outline, stack_section,
};
pub use window::*;

pub use crate::resistance::RingRow;

use crate::{
    diagnostic::Assumption,
    joint::{CooledPart, Cooling, Fastener, Joint, NotLeftOut, Sink, Zone},
    numerics::distribution::deviations,
    pressure,
    resistance::{self, Path},
};

/// The code under which `explain` tells of fields that the cone cannot carry.
pub const BEYOND_CONE: &str = "pressure/beyond-cone";

/// Fields beyond the cone in a sentence.
fn beyond_cone(fields: &[(String, &'static str)]) -> String {
    let named: Vec<String> = fields
        .iter()
        .map(|(field, why)| format!("{field} ({why})"))
        .collect();
    named.join(", ")
}

/// What else to try where a field was not found.
fn way_on(found: &pressure::elastic::Failure) -> &'static str {
    match found {
        pressure::elastic::Failure::NotConverged { .. } => THIN,
        _ => "",
    }
}

/// What defeats the solution, and what to do.
const THIN: &str = "; a plate far thinner than the others defeats it: state a foil as a filler, or take `--field cone` for two plates";

/// Why the faces do not carry a share of the clamp force, and what to do.
fn unheld(share: f64) -> String {
    // So little is missing to the solution, not to a bolt that stands beside the faces.
    const NEARLY: f64 = 0.01;
    if (share - 1.0).abs() < NEARLY {
        format!("the solution is not balanced{THIN}")
    } else {
        "bolts press where no faces meet, so the plates would tilt or bend away; put feet or plate under every bolt".to_owned()
    }
}

/// How many draws, from which seed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Options {
    /// Number of draws; none gives nominal results without a band.
    pub draws: u32,
    /// Seed of the draws.
    pub seed: u64,
}

/// Place beyond which a bolt and its lot are not told apart when they are mixed: eight standard
/// deviations, so that the ends themselves mix to an end.
const MOST_PLACE: f64 = 1.0 - 1e-15;

/// Where every uncertain input of one realisation lies; all zero is the nominal chain.
///
/// A place runs from −1 (low) to +1 (high); the quantile of the input is half of the place above −1,
/// whatever its distribution.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Realisation {
    /// Friction of the lot of all bolts, place.
    pub friction: f64,
    /// Load from outside along the bolts, place.
    pub load: f64,
    /// Torque tool, place.
    pub tool: f64,
    /// Given preload or scatter of the method, place.
    pub preload: f64,
    /// What every bolt has for itself of friction and preload, place towards more force, by file
    /// order; empty where all lie as their lot.
    pub bolts: Vec<f64>,
    /// Running torque, place.
    pub running: f64,
    /// Share of the guide losses that acts when the file asks for none, 0 to 1.
    pub loss: f64,
    /// Settling that the file asks for, place.
    pub settling: f64,
    /// Short-term relaxation that the file asks for, place.
    pub relaxation: f64,
    /// Relaxation in the long term, place.
    pub long_term: f64,
    /// Roughness of the warm and the cold faces, place.
    pub roughness: [f64; 2],
    /// Slope of the warm and the cold faces, place.
    pub slope: [f64; 2],
    /// Hardness of all faces, place.
    pub hardness: f64,
    /// Conductivity of the first and the last plate, place.
    pub conductivity: [f64; 2],
    /// Conductivity of the plates between them, place; one for all.
    pub conductivity_between: f64,
    /// Law of the solid spots or own measurements, place.
    pub law: f64,
    /// Filler resistance, place.
    pub filler: f64,
    /// Gas parameter, place.
    pub gas: f64,
    /// Form of the pressure field and of the spreading model, place.
    pub field: f64,
    /// Out-of-flatness that is stated as a height alone, place: −1 convex, +1 concave.
    pub flatness: f64,
    /// What the file states with a spread of its own, place, in the order of `Joint::uncertain`;
    /// what lies beyond the end is nominal.
    pub stated: Vec<f64>,
    /// What the grid moves source to sink by, relative to it.
    pub numerical: f64,
}

impl Realisation {
    /// Losses of the clamp force at a place: all of them at +1, the least at −1.
    pub(crate) fn losing(place: f64) -> Self {
        Self {
            loss: place.max(0.0),
            settling: place,
            relaxation: place,
            long_term: place,
            ..Self::default()
        }
    }

    /// Place of a bolt: that of its lot and its own, mixed by their shares in the variance.
    ///
    /// ```text
    /// z = √(1 − s) z_lot + √s z_own,   z = Φ⁻¹((1 + place)/2)
    /// ```
    ///
    /// Every bolt then lies as its distribution says, and any two are correlated by 1 − s in z.
    /// Checked: `bolts_mix_lot_and_own`.
    pub(crate) fn of_bolt(&self, lot: f64, (bolt, own): (usize, f64)) -> f64 {
        match self.bolts.get(bolt) {
            None => lot,
            _ if own <= 0.0 => lot,
            Some(place) if own >= 1.0 => *place,
            Some(place) => {
                let ends = |place: f64| deviations(place.clamp(-MOST_PLACE, MOST_PLACE));
                let mixed = (1.0 - own).sqrt() * ends(lot) + own.sqrt() * ends(*place);
                libm::erf(mixed * std::f64::consts::FRAC_1_SQRT_2)
            }
        }
    }

    /// Place of the conductivity of a plate of a joint.
    pub(crate) fn conductivity_of(&self, joint: &Joint, plate: usize) -> f64 {
        match plate {
            0 => self.conductivity[0],
            _ if plate == joint.plates.len() - 1 => self.conductivity[1],
            _ => self.conductivity_between,
        }
    }
}

/// Why a chain gave no number.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Failure {
    /// A property is not known at the temperature of a case.
    #[error("{0}")]
    Cold(String),
    /// A face has no hardness and no other law is given.
    #[error(
        "plate `{0}` has no hardness, so its bare contact cannot be computed; give `hardness`, a filler or measured points"
    )]
    NoHardness(String),
    /// The networks of a case gave no number.
    #[error("the heat through the plates has no number in case `{case}`: {found}")]
    Network {
        /// Name of the case.
        case: &'static str,
        /// What failed.
        found: resistance::Failure,
    },
    /// The joint states what the closed-form cone cannot carry: fields, each with the reason.
    #[error("the closed-form cone cannot carry {}", beyond_cone(.0))]
    BeyondCone(Vec<(String, &'static str)>),
    /// The plates could not be cut into networks.
    #[error("the plates cannot be cut into networks: {0}")]
    Plates(#[from] resistance::Failure),
    /// The elastic contact has no field.
    #[error("the elastic contact has no field: {}{}", .0, way_on(.0))]
    Contact(pressure::elastic::Failure),
    /// The faces do not carry the bolts.
    #[error("the faces carry {:.1} % of the clamp force: {}", 100.0 * share, unheld(*share))]
    Unbalanced {
        /// Force between the faces over the clamp force, 1.
        share: f64,
    },
    /// Bolts thread into both plates from opposite sides.
    #[error(
        "bolts thread into both plates from opposite sides; the elastic field takes threads in one of them, `--field cone` in both"
    )]
    ThreadsInBothPlates,
    /// The heat through the solved plates has no number.
    #[error("the heat through the plates has no number: {0}")]
    Heat(resistance::Failure),
    /// No clamp force is left.
    #[error(
        "no clamp force is left in service at {bolts} of {of} bolts in case `{case}`, so the joint is open there; raise the preload, lengthen the grip, match the expansion or take load off the bolts"
    )]
    Open {
        /// Bolts without force.
        bolts: usize,
        /// All bolts.
        of: usize,
        /// Name of the case.
        case: &'static str,
    },
    /// Bolts that cannot be left out.
    #[error("{0}")]
    NotLeftOut(#[from] NotLeftOut),
    /// A sweep asks for a group that is not there.
    #[error("there is no fastener group {asked}; the joint has {known}")]
    NoSuchGroup {
        /// Number asked for, from 1.
        asked: usize,
        /// Number of groups.
        known: usize,
    },
    /// A sweep of torque over a group whose preload is given.
    #[error(
        "fastener group {group} states its preload, not a torque; give `torque` and `friction` to sweep it"
    )]
    NotByTorque {
        /// Number of the group, from 1.
        group: usize,
    },
    /// A sweep without a range.
    #[error(
        "torque cannot be swept from {from} to {to} N·m; it must rise from above zero in at least two steps"
    )]
    SweepRange {
        /// Lowest torque, N m.
        from: f64,
        /// Highest torque, N m.
        to: f64,
    },
}

/// The chain at nominal inputs: every result without a band.
pub fn nominal(chain: &Chain, options: &Options) -> Result<Estimate, Failure> {
    let joint = chain.joint();
    let first = closed(chain, 0)?;
    let error = chain.discretisation_error(&first)?;
    let cases = (0..joint.service.cases.len())
        .map(|case| case_result(chain, case, error))
        .collect::<Result<Vec<CaseResult>, Failure>>()?;
    let (source_plane, sink_plane) = plane_names(joint);
    Ok(Estimate {
        title: joint.title.clone(),
        seed: options.seed,
        draws: options.draws,
        field: chain.field_name(),
        resolution: chain.resolution_name(),
        bolts_scatter: joint.bolts_scatter.words(),
        source_plane,
        sink_plane,
        heat: joint.service.heat,
        cautions: cautions::gathered(chain, &cases)?,
        cases,
        assumptions: assumptions(chain),
    })
}

/// What the file did not state, and what this chain takes for itself.
fn assumptions(chain: &Chain) -> Vec<Assumption> {
    let mut all = chain.joint().assumptions.clone();
    // The cone presses as if nothing lay between the plates, so it assumes no modulus.
    let modulus = |field: &str| field.starts_with("filler") && field.ends_with(".modulus");
    all.retain(|each| chain.knows_the_gap() || !modulus(&each.field));
    let warm = chain.knows_the_gap() && chain.joint().service.heat.is_some();
    let (value, why) = if warm {
        (
            "properties at the means of the plates",
            "conductivity and gas are taken at the mean temperature of each plate under the stated heat, contraction at \
             the sink temperature of each case",
        )
    } else {
        (
            "properties at the mean sink surface",
            "conductivity, gas and contraction are taken at the sink temperature of each case",
        )
    };
    all.push(Assumption {
        field: "service.temperature".to_owned(),
        value: value.to_owned(),
        why: why.to_owned(),
    });
    all
}

/// One thermal case, upstream first: force, pressure, conductance, resistance, temperature.
fn case_result(chain: &Chain, case: usize, numerical_error: f64) -> Result<CaseResult, Failure> {
    let joint = chain.joint();
    let named = &joint.service.cases[case];
    let state = closed(chain, case)?;
    let bolts = chain.bolts(case, &state);
    let pressure = chain.pressure(case, &state)?;
    let path = &state.path;
    let interfaces = chain.interfaces(case, (&state, &pressure))?;
    Ok(CaseResult {
        name: named.name,
        sink_temperature: named.temperature,
        sink_radiates: joint.sink.radiates(),
        bolts,
        pressure,
        interfaces,
        results: results(path),
        // Both hold: the series of isothermal planes, and the same path without a joint.
        resistance_lower: Some(path.resistance_lower.max(path.perfect_contact)),
        resistance_upper: path.resistance_upper,
        numerical_error,
        worst: None,
        draw_error: None,
        sampling: None,
        bent: None,
        footprint: chain.footprint(),
        rise: joint.service.heat.map(|heat| Rise {
            source: Band::nominal(heat * path.source_to_sink),
            hottest: Band::nominal(heat * path.hottest),
            interface_drop: Band::nominal(heat * path.interface_drop),
            coolant_drop: path.coolant_drop.map(|drop| heat * drop),
            coolant_drop_ends: None,
            above_coolant: path.coolant_drop.map(|drop| {
                [path.source_to_sink, path.hottest].map(|rise| Band::nominal(heat * (rise + drop)))
            }),
        }),
        temperatures: chain.temperatures(case)?,
        requirement: None,
        drivers: Vec::new(),
    })
}

/// The nominal state of a case in which every bolt still clamps.
fn closed(chain: &Chain, case: usize) -> Result<State, Failure> {
    let state = chain.state(case, &Realisation::default())?;
    chain.refuse_open(case, &state.conditions.forces)?;
    Ok(state)
}

fn results(path: &Path) -> Results {
    let plane = |resistance: f64| PlaneResult {
        resistance: Band::nominal(resistance),
    };
    Results {
        contact: plane(path.contact.recip()),
        node_to_node: plane(path.node_to_node),
        added_by_joint: plane(path.added_by_joint),
        source_to_sink: plane(path.source_to_sink),
        perfect_contact: plane(path.perfect_contact),
    }
}

/// Names of the planes between which source to sink stands.
pub(crate) fn plane_names(joint: &Joint) -> (String, String) {
    let warm = &joint.warm().name;
    let cold = &joint.cold().name;
    let source = match joint.source.alone().map(|source| source.zone) {
        None => format!("heated zones on {warm}, mean by heat"),
        Some(Zone::Face) => format!("outer face of {warm}, mean"),
        Some(Zone::Rectangle { .. } | Zone::Disc { .. }) => format!("heated zone on {warm}, mean"),
    };
    let sink = match &joint.sink {
        Cooling::Whole(Sink::IsothermalBack) => format!("back of {cold}, one temperature"),
        Cooling::Whole(Sink::Film(_)) => format!("back of {cold}, mean surface"),
        Cooling::Whole(Sink::Rim) => format!("rim of {cold}, one temperature"),
        Cooling::Parts(parts) => cooled_parts(cold, parts),
    };
    (source, sink)
}

/// What the parts of a sink are called together.
fn cooled_parts(cold: &str, parts: &[CooledPart]) -> String {
    let edge = |part: &CooledPart| matches!(part, CooledPart::Edge(_) | CooledPart::Rim);
    let film =
        |part: &CooledPart| matches!(part, CooledPart::Film { .. } | CooledPart::Radiation { .. });
    if parts.iter().all(edge) {
        let count = if parts.len() == 1 { "edge" } else { "edges" };
        return format!("cooled {count} of {cold}, one temperature");
    }
    if parts
        .iter()
        .all(|part| matches!(part, CooledPart::Radiation { .. }))
    {
        return format!("back of {cold}, mean surface");
    }
    let level = if parts.iter().all(film) {
        "mean surface"
    } else {
        "temperature of what is held"
    };
    format!("cooled parts of {cold}, {level}")
}

/// A fastener group for people: `M5 A2-70, 6 places`.
pub fn group_label(group: &Fastener) -> String {
    let count = group.places.len();
    let places = if count == 1 { "place" } else { "places" };
    format!(
        "{} {}, {count} {places}",
        group.thread.name, group.grade.name
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bolts_mix_lot_and_own() {
        let at = Realisation {
            bolts: vec![0.5, -0.2],
            ..Realisation::default()
        };
        let near = |found: f64, exact: f64| assert!((found - exact).abs() < 1e-12, "{found}");
        near(at.of_bolt(0.3, (0, 0.0)), 0.3);
        near(at.of_bolt(0.3, (1, 1.0)), -0.2);
        // 2 Φ(√½ Φ⁻¹(0.65) + √½ Φ⁻¹(0.75)) − 1 by SciPy 1.17.1:
        // 2*norm.cdf(.5**.5*(norm.ppf(.65)+norm.ppf(.75)))-1
        near(at.of_bolt(0.3, (0, 0.5)), 0.546383241019639);
        // The ends of both mix to an end.
        let end = Realisation {
            bolts: vec![1.0],
            ..Realisation::default()
        };
        assert!(end.of_bolt(1.0, (0, 0.3)) > 1.0 - 1e-12);
    }
}
