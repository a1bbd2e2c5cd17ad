//! What the chain asks of whoever solves contact and heat of a joint.

use std::{fmt::Debug, sync::Arc};

use crate::{
    estimate::{
        ConeBeside, FacePoint, Failure, Flatness, Meeting, PressureResult, RingRow, Temperatures,
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
    pub(super) touching: f64,
    pub(super) parted: f64,
    pub(super) conductivity: [f64; 2],
}

impl Factors {
    pub(super) const NONE: Self = Self {
        touching: 1.0,
        parted: 1.0,
        conductivity: [1.0; 2],
    };

    /// Conductivity of both plates, W/(m K).
    pub(super) fn conductivity(&self, conditions: &Conditions) -> [f64; 2] {
        [0, 1].map(|plate| conditions.conductivity[plate] * self.conductivity[plate])
    }
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

    /// Makes ready for many forces of one pattern, N, over a range of factors on them.
    fn tabulate(
        &self,
        joint: &Joint,
        level: Level,
        range: (&[f64], [f64; 2]),
    ) -> Result<(), Failure>;

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

    /// Mean pressure as the force meets it, Pa: `∫ p² dA/∫ p dA`.
    fn mean_pressure(&self) -> f64;

    /// Mean gap over the faying faces, m.
    fn gap_mean(&self) -> f64;

    /// Area of the faying faces, m².
    fn footprint(&self) -> f64;

    /// Radius of a bolt's contact, m.
    fn contact_radius(&self, bolt: usize) -> f64;

    /// How the faces meet at a point; none off the faying faces.
    fn met_at(&self, point: [f64; 2]) -> Option<Meeting>;

    /// The rings around a bolt, from its hole outward.
    fn rings(&self, bolt: usize) -> Vec<RingRow>;

    /// The field as the reader gets it, with what becomes of flatness and the cone beside it.
    fn pressure(&self, flatness: Flatness, cone: Option<ConeBeside>) -> PressureResult;

    /// Where the contact reaches an edge of plate or foot, holes not looked at; the place of the
    /// highest pressure there.
    fn pressed_edge(&self, joint: &Joint) -> Option<PressedEdge>;

    /// Temperatures at a glance.
    fn temperatures(&self) -> Temperatures;

    /// Both faying faces at points in joint coordinates; none off the faces.
    fn face_points(&self, points: &[[f64; 2]]) -> Vec<Option<FacePoint>>;

    /// Temperatures on a line through the stack, per watt above the mean sink surface, warm side
    /// first; none where the line misses it.
    fn section(&self, across: Across) -> Option<Vec<Section>>;

    /// Error of the heat that a coarser level does not tell, relative to source to sink.
    fn heat_error(&self) -> f64;
}
