//! What the chain asks of whoever solves contact and heat of a joint.

use std::{fmt::Debug, sync::Arc};

use rayon::prelude::*;

use crate::{
    estimate::{
        ConeBeside, FacePoint, Failure, Flatness, InterfaceResult, Meeting, PressureResult,
        RingRow, Temperatures,
        chain::{
            PressedEdge,
            conditions::Conditions,
            elastic::{level::Level, variant::Variant},
        },
    },
    joint::Joint,
    resistance::{
        Path,
        columns::{Across, Section},
    },
};

/// What a departure does to the faces and plates, as factors.
#[derive(Clone, Copy, Debug)]
pub(super) struct Factors {
    /// On the conductance where faces touch, of all interfaces alike.
    pub(super) touching: f64,
    /// The same where they are parted.
    pub(super) parted: f64,
    /// On the conductivity of the first plate, the last and those between.
    pub(super) conductivity: [f64; 3],
}

impl Factors {
    pub(super) const NONE: Self = Self {
        touching: 1.0,
        parted: 1.0,
        conductivity: [1.0; 3],
    };

    /// Conductivity of each plate, W/(m K).
    pub(super) fn conductivity(&self, conditions: &Conditions) -> Vec<f64> {
        let last = conditions.conductivity.len() - 1;
        let plates = conditions.conductivity.iter().enumerate();
        plates
            .map(|(plate, conductivity)| conductivity * self.conductivity[variable(plate, last)])
            .collect()
    }
}

/// Which of the three factors on conductivity a plate has.
pub(super) fn variable(plate: usize, last: usize) -> usize {
    match plate {
        0 => 0,
        _ if plate == last => 1,
        _ => 2,
    }
}

/// How much of a state's path is wanted, and how well.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Depth {
    /// Solved for itself.
    Solved,
    /// The same for source to sink alone; what tells the joint from the plates is not looked for.
    SourceToSink,
    /// Put together from those that are solved, where that is cheaper.
    Between,
}

/// A state whose path is asked for.
#[derive(Clone, Debug)]
pub(super) struct State {
    pub(super) variant: Variant,
    pub(super) conditions: Conditions,
    pub(super) factors: Factors,
    pub(super) depth: Depth,
}

/// How the faces of an interface meet as a whole, for the surfaces of the draws.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::estimate::chain) struct Met {
    /// Mean pressure as the force meets it, Pa: `∫ p² dA/∫ p dA`.
    pub(super) pressure: f64,
    /// Mean gap, m.
    pub(super) gap: f64,
    /// Share in `Σ ∫ q²/h dA` of what touches and of what is parted: how much a change of its
    /// conductance moves the resistance; any common scale.
    pub(super) shares: [f64; 2],
}

/// A way to contact and heat of one joint, for any torque and medium; it keeps what it has solved.
pub(super) trait Solver: Debug + Send + Sync {
    /// Contact and heat on one level under some conditions.
    fn solved(
        &self,
        joint: &Joint,
        task: (Level, Variant),
        under: (&Conditions, &Factors),
    ) -> Result<Arc<dyn Solved>, Failure>;

    /// Solves the contact alone, to be found when heat asks for it.
    fn expect(&self, _: &Joint, _: (Level, Variant), _: &Conditions) -> Result<(), Failure> {
        Ok(())
    }

    /// Paths of many states on one level for the draws, to about 1e-6.
    ///
    /// They differ in forces, faces, conductivities and variant; terminals are those of the first.
    fn paths(&self, joint: &Joint, level: Level, states: &[State]) -> Result<Vec<Path>, Failure> {
        let path = |state: &State| {
            let under = (&state.conditions, &state.factors);
            let solved = self.solved(joint, (level, state.variant), under)?;
            Ok(solved.path().clone())
        };
        states.par_iter().map(path).collect()
    }

    /// Makes ready for many forces of one pattern, N, over a range of factors on them.
    fn tabulate(
        &self,
        joint: &Joint,
        level: Level,
        range: (&[f64], [f64; 2]),
    ) -> Result<(), Failure>;

    /// A solver of a joint that differs in thickness, bow, film or gas; what is known of the contact goes along
    /// where it is the same.
    fn remade(&self, joint: &Joint, same_contact: bool) -> Result<Arc<dyn Solver>, Failure>;

    /// A solver of the same joint that knows what this one knows now. What either learns later stays its
    /// own, so that both may work side by side and neither moves a digit of the other.
    fn lent(&self, joint: &Joint) -> Result<Arc<dyn Solver>, Failure>;

    /// Lets go of fields that may be asked for again; they are solved anew then.
    fn forget(&self) {}

    /// What bounds the form of its field.
    fn forms(&self, joint: &Joint) -> &'static [Variant];

    /// What becomes of bow, map, sag or stated flatness on a level under some conditions.
    fn flatness(
        &self,
        joint: &Joint,
        level: Level,
        conditions: &Conditions,
    ) -> Result<Flatness, Failure>;
}

/// Contact and heat of a joint under one load.
pub(in crate::estimate::chain) trait Solved:
    Debug + Send + Sync
{
    /// Resistances.
    fn path(&self) -> &Path;

    /// How the faces of each interface meet, from warm to cold.
    fn met(&self) -> Vec<Met>;

    /// What is told of each interface, from warm to cold.
    fn interfaces(&self, joint: &Joint) -> Vec<InterfaceResult>;

    /// Area of the faying faces of the first interface, m².
    fn footprint(&self) -> f64;

    /// Radius of a bolt's contact, m.
    fn contact_radius(&self, bolt: usize) -> f64;

    /// How the faces of an interface meet at a point; none off the faying faces.
    fn met_at(&self, at: ([f64; 2], usize)) -> Option<Meeting>;

    /// The rings around every bolt in an interface, from its hole outward.
    fn rings(&self, interface: usize) -> Vec<Vec<RingRow>>;

    /// The field as the reader gets it, with what becomes of flatness and the cone beside it.
    fn pressure(&self, flatness: Flatness, cone: Option<ConeBeside>) -> PressureResult;

    /// Where the contact reaches an edge of plate or foot, holes not looked at; the place of the
    /// highest pressure there.
    fn pressed_edge(&self, joint: &Joint) -> Option<PressedEdge>;

    /// Temperatures at a glance.
    fn temperatures(&self) -> Temperatures;

    /// Both faying faces of an interface at points in joint coordinates; none off the faces.
    fn face_points(&self, points: &[[f64; 2]], interface: usize) -> Vec<Option<FacePoint>>;

    /// Temperatures on a line through the stack, per watt above the mean sink surface, warm side
    /// first; none where the line misses it.
    fn section(&self, across: Across) -> Option<Vec<Section>>;

    /// Error of the heat that a coarser level does not tell, relative to source to sink.
    fn heat_error(&self) -> f64;

    /// What heated and cooled zones too narrow for the grid may leave out of source to sink, K/W.
    fn left_out(&self) -> f64 {
        0.0
    }
}
