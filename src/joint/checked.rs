//! The checked joint: SI, nothing missing, every default already recorded as an assumption.

mod arrange;
mod bounds;
mod flatness_map;
mod heat;
mod loads;
mod plates;
mod sandwich;
mod uncertain;

use crate::{catalog, diagnostic::Assumption, numerics::distribution::Shape};

pub use arrange::{Arrange, Family, Symmetry};
pub use bounds::Bounds;
pub use flatness_map::FlatnessMap;
pub use heat::{CooledPart, Cooling, Edge, HeatedZone, Heating, Sink, Source, Zone};
pub use loads::{AxialLoad, DiscSprings, InsertHold, LockWasher};
pub use plates::{
    Bimetal, Coating, Facing, Feet, Finish, Outline, Patch, Plate, Rib, Sag, Underside,
};
pub use sandwich::{Flange, Ply, PlyKind, Sandwich};
pub use uncertain::{Bolts, Uncertain, What};

/// Most plates of a joint.
pub const MOST_PLATES: usize = 6;

/// Everything the chain needs to know of one joint. Lengths in m, every other value in SI.
///
/// Plan coordinates are those of the first plate: from its lower left corner, from its centre when
/// it is round, or as the points of its outline. The first plate is the warm side and lies on top.
#[derive(Clone, Debug, PartialEq)]
pub struct Joint {
    /// Title, as the file gives it.
    pub title: String,
    /// Medium, temperatures, heat and what is required.
    pub service: Service,
    /// Plates from warm to cold; two to [`MOST_PLATES`].
    pub plates: Vec<Plate>,
    /// Where heat enters the first plate.
    pub source: Heating,
    /// Where heat leaves the last plate.
    pub sink: Cooling,
    /// Groups of like fasteners; at least one, each with at least one place.
    pub fasteners: Vec<Fastener>,
    /// How the faces touch.
    pub contact: Contact,
    /// What fills the gaps of each interface instead of the medium, from warm to cold.
    pub fillers: Vec<Option<Filler>>,
    /// The user's own measurements; they override the laws.
    pub measured: Option<Measured>,
    /// Losses of clamp force asked for; without them losses act on the low force only.
    pub losses: Option<Losses>,
    /// What the joint costs by the user's own measure.
    pub cost: Option<f64>,
    /// Bolts that are left out, counted from 0 in file order, rising; their holes stay.
    pub missing: Vec<usize>,
    /// What a search of layouts may try; none where the file says nothing of it.
    pub arrange: Option<Arrange>,
    /// Values that the file states with a spread of their own.
    pub uncertain: Vec<Uncertain>,
    /// Whether the bolts scatter alike.
    pub bolts_scatter: Bolts,
    /// What the file did not state.
    pub assumptions: Vec<Assumption>,
}

/// What surrounds the joint and what is asked of it.
#[derive(Clone, Debug, PartialEq)]
pub struct Service {
    /// Vacuum or a gas.
    pub medium: Medium,
    /// One case, named `service`, or the cases `hot` and `cold`, hot first.
    pub cases: Vec<Case>,
    /// Temperature at which the bolts were tightened, K.
    pub assembly_temperature: f64,
    /// Heat through the joint, W.
    pub heat: Option<f64>,
    /// What the joint must meet.
    pub require: Option<Requirement>,
}

/// A sink temperature with its name.
#[derive(Clone, Debug, PartialEq)]
pub struct Case {
    /// `service`, `hot` or `cold`.
    pub name: &'static str,
    /// Mean sink surface temperature, K.
    pub temperature: f64,
}

/// What fills the space between the faces where nothing else does.
#[derive(Clone, Debug, PartialEq)]
#[expect(
    clippy::large_enum_variant,
    reason = "a joint has one medium; a box would save nothing"
)]
pub enum Medium {
    /// No gas at all.
    Vacuum,
    /// A gas at an absolute pressure, Pa.
    Gas {
        /// The gas.
        gas: catalog::Gas,
        /// Absolute pressure, Pa.
        pressure: f64,
    },
}

/// The limit a joint must meet.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Requirement {
    /// Which quantity is limited.
    pub kind: RequirementKind,
    /// Limit in K, K/W or W/K.
    pub limit: f64,
    /// Whether the value must stay below or above the limit.
    pub bound: Limit,
}

/// The quantity a requirement limits.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum RequirementKind {
    /// Mean source above mean sink surface, K.
    Rise,
    /// Hottest point of the first plate above the mean sink surface, K.
    HottestRise,
    /// Mean source above the coolant, K.
    AboveCoolant,
    /// Hottest point of the first plate above the coolant, K.
    HottestAboveCoolant,
    /// Mean temperature drop across the interface, K.
    InterfaceDrop,
    /// One of the results, as resistance, K/W.
    Resistance(Plane),
    /// One of the results, as conductance, W/K.
    Conductance(Plane),
}

/// The pair of planes between which a result stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Plane {
    /// The faying faces alone: the ring sum.
    Contact,
    /// Mean of the first plate to mean of the last.
    NodeToNode,
    /// What the joint adds to the same path with perfect contact.
    AddedByJoint,
    /// Mean of the heated zone to mean of the sink surface.
    SourceToSink,
}

/// The side of a limit on which a value must lie.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Limit {
    /// At most the limit.
    Most,
    /// At least the limit.
    Least,
}

/// A group of like fasteners.
#[derive(Clone, Debug, PartialEq)]
pub struct Fastener {
    /// Thread.
    pub thread: catalog::Thread,
    /// Strength grade and bolt material.
    pub grade: catalog::Grade,
    /// Annulus on which the head (or its washer) presses the plate it sits on.
    pub head_seat: Seat,
    /// Annulus on which the nut presses, when there is one.
    pub nut_seat: Option<Seat>,
    /// Radius of the annulus on which friction turns, mean, m.
    pub friction_radius: f64,
    /// Whether the seat is a cone (countersunk head).
    pub conical_seat: bool,
    /// Hole radius in each plate, from warm to cold, m.
    pub hole_radius: Vec<f64>,
    /// Total thickness of washers in the grip, m.
    pub washer_thickness: f64,
    /// Number of washers in the grip; each adds a contact that settles.
    pub washers: u32,
    /// What head, nut and washers are made of, by volume.
    pub hardware: Hardware,
    /// Whether the head is a cylinder (socket head) rather than a hexagon.
    pub cylindrical_head: bool,
    /// How the far end holds.
    pub engagement: Engagement,
    /// The flange of its inserts, where it is stated.
    pub flange: Option<Flange>,
    /// How the bolt is tightened.
    pub tightening: Tightening,
    /// Index of the plate on which the head sits.
    pub head_plate: usize,
    /// Whether the shank conducts heat.
    pub shank_path: bool,
    /// Washers that keep the heat of the plates from head and nut.
    pub isolating: Option<Isolating>,
    /// A load from outside along each bolt.
    pub axial_load: Option<AxialLoad>,
    /// Disc springs under head or nut.
    pub disc_springs: Option<DiscSprings>,
    /// The spring washer under the head.
    pub lock_washer: LockWasher,
    /// How its inserts are held.
    pub insert_hold: InsertHold,
    /// Places in joint coordinates, m.
    pub places: Vec<[f64; 2]>,
}

/// Volumes of the parts of one bolt, m³; none where the catalogue has no size.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hardware {
    /// Head.
    pub head: Option<f64>,
    /// Nut with its height, m; none for a thread in the plate.
    pub nut: Option<(f64, f64)>,
    /// All washers of the bolt's own material.
    pub washers: Option<f64>,
}

/// Isolating washers of a bolt, all alike.
#[derive(Clone, Debug, PartialEq)]
pub struct Isolating {
    /// Their material.
    pub material: catalog::Material,
    /// Thickness of each, m.
    pub thickness: f64,
    /// How many: under the head, under the nut, or both.
    pub count: u32,
}

impl Isolating {
    /// Thickness of all together, m.
    pub fn height(&self) -> f64 {
        f64::from(self.count) * self.thickness
    }
}

/// A flat annulus that carries the clamp force.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Seat {
    /// Inner radius, m.
    pub inner_radius: f64,
    /// Outer radius, m.
    pub outer_radius: f64,
}

impl Seat {
    /// Area of the annulus, m².
    pub fn area(&self) -> f64 {
        std::f64::consts::PI * (self.outer_radius.powi(2) - self.inner_radius.powi(2))
    }
}

/// How the far end of a bolt holds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Engagement {
    /// A nut on the outer face of the far plate.
    Nut,
    /// A thread cut in the far plate.
    Tapped {
        /// Engaged length, m.
        length: f64,
    },
    /// A threaded insert in the far plate.
    Insert {
        /// Engaged length, m.
        length: f64,
    },
}

/// How a bolt gets its clamp force.
#[derive(Clone, Debug, PartialEq)]
pub enum Tightening {
    /// By torque.
    Torque(TorqueTightening),
    /// The clamp force is known, N.
    Preload(Bounds),
}

/// Tightening by torque.
#[derive(Clone, Debug, PartialEq)]
pub struct TorqueTightening {
    /// Torque at the wrench, running torque included, N m.
    pub torque: f64,
    /// Tolerance of the tool, as a fraction.
    pub tolerance: f64,
    /// How the weight lies within the tolerance.
    pub tool: Shape,
    /// Running (prevailing) torque of the locking feature, N m.
    pub running: f64,
    /// Its spread, N m, where one is stated.
    pub running_spread: Option<Bounds>,
    /// Whether the file states the running torque.
    pub running_stated: bool,
    /// Friction.
    pub friction: Friction,
    /// Half-width of the scatter of the tightening method, as a fraction; when given it stands
    /// for friction and tool together.
    pub scatter: Option<f64>,
}

/// Friction of thread and head.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Friction {
    /// Coefficients; both move together between their bounds unless stated otherwise.
    Coefficients {
        /// Between the threads.
        thread: Bounds,
        /// Under the turned head or nut.
        head: Bounds,
    },
    /// Nut factor K of T = K d F.
    NutFactor(Bounds),
}

/// How the faces touch.
#[derive(Clone, Debug, PartialEq)]
pub struct Contact {
    /// Law of the solid spots.
    pub law: Law,
    /// Factor by which the law may be off either way, one standard deviation.
    pub law_factor: f64,
    /// Rule for the extent of contact.
    pub cone: ConeRule,
    /// Shape of the pressure over the radius.
    pub shape: ConeShape,
    /// Hemispherical emissivity of the warm and the cold face of each interface.
    pub emissivity: Vec<[f64; 2]>,
    /// How the heads press.
    pub head_model: HeadModel,
    /// Whether the faces slide on each other.
    pub faces: FaceFriction,
    /// What yields between the faces.
    pub compliance: Compliance,
}

/// How heads and nuts press on their seats.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HeadModel {
    /// One pressure over the seat.
    Uniform,
    /// One displacement where it touches, without friction; it may lift off but not tilt.
    Rigid,
}

/// Whether the faying faces slide on each other.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum FaceFriction {
    /// They slide freely.
    Frictionless,
    /// They do not slide where they touch; in a round pair but for the last hundredths of the thickness
    /// before the contact edge.
    Stuck,
}

/// What yields between the faying faces, besides the plates.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Compliance {
    /// Nothing: contact is hard.
    Hard,
    /// The asperities.
    Asperities,
}

/// Law of the solid spots.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Law {
    /// Sridhar & Yovanovich 1996: continuous from elastic to plastic.
    ElasticPlastic,
    /// Yovanovich 1982.
    Plastic,
    /// Mikic 1974.
    Elastic,
    /// 1.25 (P/H)^0.95 at any pressure, for comparison with papers.
    PlasticPower,
}

/// Rule for the extent of contact.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ConeRule {
    /// The fitted law of this house.
    Fitted,
    /// A fixed half-angle, rad.
    HalfAngle(f64),
    /// The angle of the stiffness cone of VDI 2230.
    Vdi,
}

/// Shape of the pressure between hole and contact edge.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ConeShape {
    /// The fitted power shape; belongs to the fitted rule.
    Fitted,
    /// One pressure.
    Uniform,
    /// Straight to zero at the edge.
    Linear,
    /// Quartic with zero value, slope and curvature at the edge.
    Polynomial,
}

/// What fills the joint.
#[derive(Clone, Debug, PartialEq)]
pub struct Filler {
    /// Name for people.
    pub name: String,
    /// How it conducts.
    pub kind: FillerKind,
    /// Factor by which its resistance may be off either way, one standard deviation.
    pub factor: f64,
    /// Modulus of a layer under pressure over its whole face, Pa; none where it is not known or
    /// the filler flows. What it stands for: [`Filler::stiffness`].
    pub modulus: Option<f64>,
    /// Thickness of a layer in the joint, m; none for what flows and for a table of one's own.
    pub thickness: Option<f64>,
    /// Density, kg/m³; none where the catalogue has none.
    pub density: Option<f64>,
}

impl Filler {
    /// Pressure over closure of a layer that yields elastically, Pa/m; none for what flows away
    /// and where no modulus is known.
    ///
    /// ```text
    /// κ = M/t        M = E (1 − ν)/((1 + ν)(1 − 2ν)) where it cannot bulge,   M ≈ E where it can
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `M` | modulus under pressure over the whole face | Pa | `modulus` |
    /// | `t` | thickness in the joint | m | `thickness` |
    /// | `E`, `ν` | Young's modulus and Poisson's ratio of the layer | Pa, 1 | |
    ///
    /// A thin wide layer between plates that hold its faces cannot bulge: a foamed or porous one
    /// (ν near 0) then keeps `M = E`, rubber (ν near 0.5) becomes stiff by its bulk modulus. The
    /// layer is a bed of springs that do not pull: beside the pressed part the faces lift off it.
    ///
    /// Valid: closure small against `t`; a modulus of first loading, the secant to the pressure met.
    /// Source: elasticity of one-sided strain, textbook form.
    /// Checked: `a_layer_of_known_modulus_is_a_bed_of_springs`.
    pub fn stiffness(&self) -> Option<f64> {
        match self.kind {
            FillerKind::Layer { .. } | FillerKind::Foil { .. } | FillerKind::Table { .. } => {
                Some(self.modulus? / self.thickness?)
            }
            FillerKind::Fluid { .. } | FillerKind::Paste { .. } => None,
        }
    }
}

/// How a filler conducts.
#[derive(Clone, Debug, PartialEq)]
pub enum FillerKind {
    /// A liquid in the gaps beside the solid spots.
    Fluid {
        /// Conductivity, W/(m K).
        conductivity: f64,
    },
    /// A soft foil that flows into both faces: R″ = t/k and two boundaries that fall with pressure.
    Foil {
        /// Conductivity, W/(m K).
        conductivity: f64,
        /// Thickness, m.
        thickness: f64,
        /// Hardness of the foil, Pa.
        hardness: f64,
    },
    /// A layer of known thickness: R″ = t/k + boundary.
    Layer {
        /// Conductivity, W/(m K).
        conductivity: f64,
        /// Thickness, m.
        thickness: f64,
        /// Both boundaries together, m² K/W.
        boundary: f64,
    },
    /// A filled paste whose bond line thins under pressure.
    Paste {
        /// Conductivity, W/(m K).
        conductivity: f64,
        /// Yield stress, Pa.
        yield_stress: f64,
        /// Thinnest bond line: the largest filler particle, m.
        thinnest: f64,
        /// Thickness as applied, which stays where the pressure is nil, m.
        applied: f64,
    },
    /// Area resistance against pressure.
    Table {
        /// (pressure, Pa; area resistance, m² K/W), pressure rising.
        points: Vec<(f64, f64)>,
    },
}

/// The user's own measurements.
#[derive(Clone, Debug, PartialEq)]
pub struct Measured {
    /// What was measured.
    pub kind: MeasuredKind,
    /// Factor by which they may be off either way, one standard deviation.
    pub factor: f64,
}

/// What was measured.
#[derive(Clone, Debug, PartialEq)]
pub enum MeasuredKind {
    /// (pressure, Pa; conductance, W/(m² K)), pressure rising; log-log between.
    Local {
        /// The points.
        points: Vec<(f64, f64)>,
    },
    /// W/K of one bolt: `G = conductance · (F/force)^force_exponent · (T/temperature)^temperature_exponent`,
    /// or the same of its torque.
    ForceLaw {
        /// Conductance at the reference, W/K.
        conductance: f64,
        /// Reference load.
        load: LawLoad,
        /// Exponent of the force or torque, 1.
        force_exponent: f64,
        /// Reference temperature, K.
        temperature: f64,
        /// Exponent of the temperature, 1.
        temperature_exponent: f64,
    },
}

/// At which load of a bolt a measured law states its conductance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum LawLoad {
    /// Clamp force, N.
    Force(f64),
    /// Tightening torque, N m.
    Torque(f64),
}

/// Losses of clamp force that the file asks for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Losses {
    /// Sum of settling over all contacts of one bolt, m; none stands for the guide values of its
    /// stack.
    pub settling: Option<Bounds>,
    /// Short-term relaxation as a fraction of the clamp force.
    pub relaxation: Bounds,
    /// Whether the bolts are tightened again after settling.
    pub retightened: Retightened,
    /// Relaxation in the long term as a fraction of the clamp force; exactly zero where none is
    /// stated.
    pub long_term: Bounds,
    /// What a bolt loses while the others are tightened, as a fraction of its clamp force; none stands
    /// for the judgement on its joint.
    pub interaction: Option<f64>,
}

/// Whether bolts are tightened again after they have settled.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Retightened {
    /// To the full torque: settling and short-term relaxation are over.
    Yes,
    /// Never.
    No,
}

impl Joint {
    /// The warm plate, on top.
    pub fn warm(&self) -> &Plate {
        &self.plates[0]
    }

    /// The cold plate.
    pub fn cold(&self) -> &Plate {
        &self.plates[self.plates.len() - 1]
    }

    /// Every bolt in file order: its group and its place.
    pub fn bolts(&self) -> impl Iterator<Item = (&Fastener, [f64; 2])> {
        self.fasteners
            .iter()
            .flat_map(|group| group.places.iter().map(move |place| (group, *place)))
    }
}
