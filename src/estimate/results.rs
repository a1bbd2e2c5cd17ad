//! What the chain found: plain results, upstream first.

use crate::{
    diagnostic::{
        Assumption, Caution,
        registry::{self, Gravity},
    },
    estimate::{
        Bent, Met, RequirementResult, Temperatures, TorqueWindow,
        cautions::{FLATNESS_DECIDES, GAP_IGNORED},
    },
    joint::{Joint, Limit},
    preload::Shared,
    resistance::Path,
};

/// Low, nominal and high of one number; low and high are absent when no draws were made.
///
/// Where faces may be bent either way, low and high are the lowest and the highest of the quantiles of
/// every way.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Band {
    /// 5 % quantile, or the unfavourable corner for forces.
    pub low: Option<f64>,
    /// The chain at nominal inputs.
    pub nominal: f64,
    /// 95 % quantile, or the favourable corner for forces.
    pub high: Option<f64>,
}

impl Band {
    /// A number without a band.
    pub const fn nominal(nominal: f64) -> Self {
        Self {
            low: None,
            nominal,
            high: None,
        }
    }

    /// Every number times a positive factor.
    #[must_use]
    pub fn times(&self, factor: f64) -> Self {
        Self {
            low: self.low.map(|low| low * factor),
            nominal: self.nominal * factor,
            high: self.high.map(|high| high * factor),
        }
    }

    /// Every number plus one.
    #[must_use]
    pub fn plus(&self, more: f64) -> Self {
        Self {
            low: self.low.map(|low| low + more),
            nominal: self.nominal + more,
            high: self.high.map(|high| high + more),
        }
    }

    /// Conductance from resistance and back: the ends change places.
    #[must_use]
    pub fn inverse(&self) -> Self {
        Self {
            low: self.high.map(f64::recip),
            nominal: self.nominal.recip(),
            high: self.low.map(f64::recip),
        }
    }
}

/// One of the four results between its planes, K/W; conductance is its inverse.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PlaneResult {
    /// Resistance, K/W.
    pub resistance: Band,
}

/// The five results of one thermal case.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Results {
    /// The faying faces alone: ring sum; in a stack those of all interfaces in series.
    pub contact: PlaneResult,
    /// Mean of the first plate to mean of the last.
    pub node_to_node: PlaneResult,
    /// What the joint adds to the same path with perfect contact.
    pub added_by_joint: PlaneResult,
    /// Heated zone to sink surface.
    pub source_to_sink: PlaneResult,
    /// The same path with no joint resistance.
    pub perfect_contact: PlaneResult,
}

/// One bolt.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BoltResult {
    /// Place in joint coordinates, m.
    pub at: [f64; 2],
    /// Whether it is left out, so that its hole alone is there.
    pub missing: bool,
    /// Clamp force at assembly, N.
    pub force: Band,
    /// Clamp force after losses, N.
    pub force_in_service: Band,
    /// Equivalent stress over yield: nominal and at the highest force; none without a yield strength.
    pub strength_use: Option<[f64; 2]>,
    /// What a load from outside does in this case; none where none is stated.
    pub axial: Option<Shared>,
    /// Equivalent stress in service over yield at the worst case; none without a yield strength.
    pub use_in_service: Option<f64>,
    /// Largest torque that passes every limit, N m; none when the preload is given.
    pub largest_torque: Option<f64>,
    /// Radius where contact ends, m.
    pub contact_radius: f64,
    /// Ring sum of this bolt at nominal, W/K.
    pub contact_conductance: f64,
}

impl BoltResult {
    /// A bolt that is left out: nothing clamps and nothing conducts.
    pub(crate) fn missing(at: [f64; 2]) -> Self {
        let none = Band {
            low: Some(0.0),
            nominal: 0.0,
            high: Some(0.0),
        };
        Self {
            at,
            missing: true,
            force: none,
            force_in_service: none,
            axial: None,
            strength_use: None,
            use_in_service: None,
            largest_torque: None,
            contact_radius: 0.0,
            contact_conductance: 0.0,
        }
    }
}

/// The pressure between the faces at nominal force.
#[derive(Clone, Debug, PartialEq)]
pub struct PressureResult {
    /// Highest pressure, Pa.
    pub peak: f64,
    /// Area in contact, m².
    pub contact_area: f64,
    /// Distance from the nearest bolt axis that holds 95 % of the force, m.
    pub radius_95: f64,
    /// Force carried, N.
    pub force: f64,
    /// Widest gap, m; the cone knows none.
    pub gap_max: Option<f64>,
    /// Mean gap, m; the cone knows none.
    pub gap_mean: Option<f64>,
    /// What only a solved field tells; none for the cone.
    pub solved: Option<SolvedField>,
}

/// One interface at nominal inputs.
#[derive(Clone, Debug, PartialEq)]
pub struct InterfaceResult {
    /// Names of the plates that meet there, warm one first.
    pub plates: [String; 2],
    /// Ring sum, W/K.
    pub contact: f64,
    /// Force carried, N.
    pub force: f64,
    /// Highest pressure, Pa.
    pub peak: f64,
    /// Area in contact, m².
    pub contact_area: f64,
    /// Widest gap, m; the cone knows none.
    pub gap_max: Option<f64>,
    /// Mean drop per watt through the joint, K/W.
    pub drop: f64,
}

impl InterfaceResult {
    /// The plates in words: `box and shim`.
    pub fn between(&self) -> String {
        self.plates.join(" and ")
    }

    /// The one interface of two plates, as path and pressure tell of it.
    pub(crate) fn only(joint: &Joint, path: &Path, pressure: &PressureResult) -> Self {
        Self {
            plates: joint.meeting(0).map(|plate| plate.name.clone()),
            contact: path.contact,
            force: pressure.force,
            peak: pressure.peak,
            contact_area: pressure.contact_area,
            gap_max: pressure.gap_max,
            drop: path.interface_drop,
        }
    }
}

/// What an elastic field tells beyond pressure and gap.
#[derive(Clone, Debug, PartialEq)]
pub struct SolvedField {
    /// Mean distance of the force from the nearest bolt axis, m.
    pub mean_force_radius: f64,
    /// Whether bow, map, sag and stated flatness close under the bolts.
    pub flatness: Flatness,
    /// What the cone says of the same joint; none where it cannot carry the joint.
    pub cone: Option<ConeBeside>,
    /// How well the solver did.
    pub health: SolverHealth,
}

/// What becomes of faces that are not flat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Flatness {
    /// Neither stated nor given: flat faces.
    Flat,
    /// A known shape: it is part of the nominal field.
    Known {
        /// Widest initial gap, m, lowest point of contact at zero.
        initial: f64,
        /// Widest gap under the bolts, m.
        left: f64,
        /// Widest gap of the same joint with flat faces, m.
        flat: f64,
    },
    /// Only stated as a height: taken convex and concave for low and high.
    Stated {
        /// Both faces together, m.
        height: f64,
        /// Widest gap when the faces are convex (open at the edge) and concave, m.
        left: [f64; 2],
        /// Widest gap with flat faces, m.
        flat: f64,
    },
}

impl Flatness {
    /// Share by which the widest gap may pass that of flat faces when a shape counts as closed.
    const CLOSED: f64 = 0.25;

    /// Whether the bolts close the shape: the gap left is hardly wider than that of flat faces.
    ///
    /// A quarter more than flat faces counts as closed (judgement: it moved the resistance of a
    /// reference joint by 1 % in vacuum and 3 % in air).
    pub fn closes(&self) -> Option<bool> {
        let (left, flat) = match *self {
            Self::Flat => return None,
            Self::Known { left, flat, .. } => (left, flat),
            Self::Stated { left, flat, .. } => (left[0].max(left[1]), flat),
        };
        Some(left <= (1.0 + Self::CLOSED) * flat)
    }
}

/// The cone's answer for the same joint, at the same nominal inputs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ConeBeside {
    /// Distance from the nearest bolt axis that holds 95 % of the force, m.
    pub radius_95: f64,
    /// Ring sum as a resistance, K/W.
    pub contact: f64,
    /// Source to sink, K/W.
    pub source_to_sink: f64,
}

/// How a solver came to its field, and what is left.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SolverHealth {
    /// Unknown displacements.
    pub unknowns: usize,
    /// Steps of the contact search.
    pub steps: usize,
    /// Rounds of the linear solver, all steps together; none where it eliminates.
    pub rounds: usize,
    /// Force between the faces over clamp force, off from 1.
    pub force_balance: f64,
    /// Largest breach of "no pull, no overlap" over the peak pressure or the widest gap.
    pub complementarity: f64,
    /// Whether the energy fell in every step; none where no step is taken by energy.
    pub energy_fell: Option<bool>,
    /// Residual of the last linear system over its load; none where it is eliminated.
    pub residual: Option<f64>,
    /// Heat in over heat out, off from 1.
    pub heat_balance: f64,
}

/// Temperature rises above the mean sink surface, K.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rise {
    /// Mean of the source.
    pub source: Band,
    /// Hottest point of the first plate.
    pub hottest: Band,
    /// Mean drop across the interface; in a stack the sum over all interfaces.
    pub interface_drop: Band,
    /// Film drop from the sink surface to the coolant, where there is a film.
    pub coolant_drop: Option<f64>,
    /// Its low and high, where a film or the heat is stated with a spread.
    pub coolant_drop_ends: Option<[f64; 2]>,
    /// Mean of the source and hottest point above the coolant, where there is a film.
    pub above_coolant: Option<[Band; 2]>,
}

/// One thermal case: a sink temperature and everything that follows from it.
#[derive(Clone, Debug, PartialEq)]
pub struct CaseResult {
    /// `service`, `hot` or `cold`.
    pub name: &'static str,
    /// Mean sink surface temperature, K.
    pub sink_temperature: f64,
    /// Whether the sink surface radiates, so that its temperature follows from the heat.
    pub sink_radiates: bool,
    /// Every bolt in file order.
    pub bolts: Vec<BoltResult>,
    /// The pressure field; in a stack that of the first interface.
    pub pressure: PressureResult,
    /// Every interface, from warm to cold.
    pub interfaces: Vec<InterfaceResult>,
    /// The results.
    pub results: Results,
    /// Proved lower bound of source to sink for the field used, K/W.
    pub resistance_lower: Option<f64>,
    /// Proved upper bound of source to sink for the field used, K/W; single round joints only.
    pub resistance_upper: Option<f64>,
    /// Ring discretisation error, relative to source to sink.
    pub numerical_error: f64,
    /// Every input at its unfavourable end; none without draws, and where an end has no number.
    pub worst: Option<Worst>,
    /// Largest error of the surface that the draws are read from, relative to source to sink; none
    /// where every draw is solved, and without draws.
    pub draw_error: Option<f64>,
    /// How well the draws know the ends of the bands; none without draws, and with too few to tell.
    pub sampling: Option<Sampling>,
    /// Low and high of source to sink by the way the faces are bent, K/W; none where they are not bent by
    /// themselves, and without draws.
    pub bent: Option<Bent>,
    /// Area of the faying faces, m²; in a stack that of the first interface.
    pub footprint: f64,
    /// Temperature rises, when heat is stated.
    pub rise: Option<Rise>,
    /// Temperatures of a solved heat at nominal; none for the cone, which solves none.
    pub temperatures: Option<Temperatures>,
    /// The requirement, when stated.
    pub requirement: Option<RequirementResult>,
    /// Share of the variance of the source-to-sink resistance by input, largest first; empty without draws.
    pub drivers: Vec<Driver>,
}

/// How well draws know the ends of the bands: standard errors of low and high, K/W.
#[derive(Clone, Debug, PartialEq)]
pub struct Sampling {
    /// Independent scramblings among which the draws are divided.
    pub scrambles: usize,
    /// Faying faces alone.
    pub contact: [f64; 2],
    /// Node to node.
    pub node_to_node: [f64; 2],
    /// Added by the joint.
    pub added_by_joint: [f64; 2],
    /// Source to sink.
    pub source_to_sink: [f64; 2],
    /// Source to sink after a fourth, a half and all of the draws.
    pub course: Vec<Checkpoint>,
}

/// The ends of a band after so many draws, as they were drawn, K/W.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Checkpoint {
    /// Draws so far.
    pub draws: usize,
    /// 5 % quantile.
    pub low: f64,
    /// 95 % quantile.
    pub high: f64,
}

/// Least and most of the four results with every input at the end that leads there, K/W.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Worst {
    /// The faying faces alone.
    pub contact: [f64; 2],
    /// Mean of the first plate to mean of the last.
    pub node_to_node: [f64; 2],
    /// What the joint adds to the same path with perfect contact.
    pub added_by_joint: [f64; 2],
    /// Heated zone to sink surface.
    pub source_to_sink: [f64; 2],
}

/// One input and its share of the spread.
#[derive(Clone, Debug, PartialEq)]
pub struct Driver {
    /// The input.
    pub input: &'static str,
    /// Share of the variance, 0 to 1.
    pub share: f64,
    /// What the engineer can do about it.
    pub remedy: &'static str,
}

/// Error of the surface of the draws above which the reader is told.
const NOTICEABLE_DRAW_ERROR: f64 = 0.02;

/// Everything `estimate` found, upstream first.
#[derive(Clone, Debug, PartialEq)]
pub struct Estimate {
    /// Title of the joint.
    pub title: String,
    /// Seed of the draws.
    pub seed: u64,
    /// Number of draws; 0 means nominal only.
    pub draws: u32,
    /// The field: `cone` or `elastic`.
    pub field: &'static str,
    /// The resolution: `fast`, `normal` or `fine`.
    pub resolution: &'static str,
    /// How the bolts scatter together, in words.
    pub bolts_scatter: String,
    /// Name of the source plane.
    pub source_plane: String,
    /// Name of the sink plane.
    pub sink_plane: String,
    /// Heat through the joint, W.
    pub heat: Option<f64>,
    /// The cases; the first is the one the headline speaks of.
    pub cases: Vec<CaseResult>,
    /// Cautions, most grave first.
    pub cautions: Vec<Caution>,
    /// What the file did not state.
    pub assumptions: Vec<Assumption>,
}

impl Estimate {
    /// The requirement at the case that stands worst to it, with the name of that case.
    pub fn requirement(&self) -> Option<(&'static str, &RequirementResult)> {
        let rank = |result: &RequirementResult| match result.met {
            Met::Yes => 0,
            Met::Uncertain => 1,
            Met::No => 2,
        };
        // A limit from above is worst at the largest value, one from below at the smallest.
        let excess = |result: &RequirementResult| match result.bound {
            Limit::Most => result.value,
            Limit::Least => -result.value,
        };
        self.cases
            .iter()
            .filter_map(|case| Some((case.name, case.requirement.as_ref()?)))
            .max_by(|(_, one), (_, other)| {
                rank(one)
                    .cmp(&rank(other))
                    .then(excess(one).total_cmp(&excess(other)))
            })
    }

    /// Adds a word where the surface that the draws are read from errs noticeably.
    pub(crate) fn caution_of_draws(&mut self) {
        let errors = self.cases.iter().filter_map(|case| case.draw_error);
        let error = errors.fold(0.0, f64::max);
        if error > NOTICEABLE_DRAW_ERROR {
            self.cautions.push(Caution {
                code: "resistance/draw-error",
                text: format!(
                    "low and high are read from surfaces through solved states; they err by up to {:.1} % of source to \
                     sink at the states solved to check them",
                    100.0 * error
                ),
            });
            registry::sort_by_gravity(&mut self.cautions);
        }
    }

    /// Whether stated bow or flatness is too large for a field of flat faces.
    pub fn flatness_decides(&self) -> bool {
        self.cautions
            .iter()
            .any(|caution| caution.code == FLATNESS_DECIDES)
    }

    /// Whether a caution speaks of this joint, beyond the duties of care that go with every one.
    pub fn has_cautions(&self) -> bool {
        self.cautions
            .iter()
            .any(|caution| registry::gravity(caution.code) != Gravity::Standing)
    }
}

/// One torque of a sweep.
#[derive(Clone, Debug, PartialEq)]
pub struct TorquePoint {
    /// Torque at the wrench, N m.
    pub torque: f64,
    /// Clamp force at assembly, N.
    pub force: Band,
    /// Source to sink, K/W.
    pub source_to_sink: Band,
    /// Contact only, K/W.
    pub contact: Band,
    /// What the joint adds, K/W.
    pub added_by_joint: Band,
    /// Equivalent stress over yield: nominal and at the highest force.
    pub strength_use: Option<[f64; 2]>,
    /// Whether every strength limit holds at this torque.
    pub passes: bool,
}

/// The torque at which source to sink is lowest.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Minimum {
    /// Torque, N m.
    pub torque: f64,
    /// Source to sink there at nominal, K/W.
    pub source_to_sink: f64,
    /// What the joint adds there at nominal, K/W.
    pub added_by_joint: f64,
}

/// Resistance against the torque of one fastener group, the others as stated.
#[derive(Clone, Debug, PartialEq)]
pub struct TorqueSweep {
    /// Title of the joint.
    pub title: String,
    /// Group that is varied, for people: `M4 socket, 6 places`.
    pub group: String,
    /// The case that stands worst: `service`, `hot` or `cold`.
    pub case: &'static str,
    /// The field: `cone` or `elastic`.
    pub field: &'static str,
    /// The resolution: `fast`, `normal` or `fine`.
    pub resolution: &'static str,
    /// Torque stated in the file, N m.
    pub stated: f64,
    /// Largest torque that passes every limit, N m, and the limit that ends it.
    pub largest: Option<(f64, &'static str)>,
    /// Torque of the lowest source-to-sink resistance among those that strength allows and separation asks
    /// for, N m; of the highest where the requirement asks for at least so much.
    pub best: Option<f64>,
    /// The lowest point of the curve between swept torques, where it has one inside the window.
    pub minimum: Option<Minimum>,
    /// Source to sink at the stated torque itself, K/W.
    pub at_stated: f64,
    /// The joint at the torque where strength ends or separation begins, where that is the best and stands
    /// between two rows.
    pub at_limit: Option<Minimum>,
    /// Whether faces may be bent either way, so that low and high hold for each.
    pub bends: bool,
    /// Points, torque rising, the stated torque among them where it lies in the range.
    pub points: Vec<TorquePoint>,
    /// Requirement in K/W of source to sink, where one can be put so.
    pub required: Option<(f64, Limit)>,
    /// The torques that heat and strength allow.
    pub window: TorqueWindow,
    /// Cautions.
    pub cautions: Vec<Caution>,
}

impl TorqueSweep {
    /// Whether the joint is to resist: the best torque is then that of most resistance.
    pub fn resists(&self) -> bool {
        matches!(self.required, Some((_, Limit::Least)))
    }

    /// The minimum of the curve where separation lets it stand; below, the faces may part before it.
    pub fn held_minimum(&self) -> Option<Minimum> {
        let least = self.window.least().map_or(0.0, |least| least.torque);
        self.minimum.filter(|minimum| minimum.torque >= least)
    }

    /// Whether the gap between the bolts, which grows with the force, matters and is not known.
    pub fn gap_unknown(&self) -> bool {
        self.cautions
            .iter()
            .any(|caution| caution.code == GAP_IGNORED)
    }
}

/// The plan of the joint and its fields at nominal, for drawings.
#[derive(Clone, Debug, PartialEq)]
pub struct FieldMap {
    /// Left, lower, right and upper edge of the window, m.
    pub window: [f64; 4],
    /// Columns and rows.
    pub size: [usize; 2],
    /// Pressure at cell centres, row by row from below, Pa; NaN off the faying faces.
    pub pressure: Vec<f64>,
    /// Local conductance, W/(m² K), likewise.
    pub conductance: Vec<f64>,
    /// Gap between the faces, m, zero in contact, likewise; none for the cone, which knows none.
    pub gap: Option<Vec<f64>>,
}
