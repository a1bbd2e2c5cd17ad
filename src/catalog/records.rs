//! The records of the catalogue, in SI.

use crate::numerics::distribution::Shape;

/// Where a value comes from and how far it may be trusted.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Status {
    /// Read in the named source.
    Seen,
    /// From memory, not verified against a source.
    Memory,
    /// Computed from a formula or by a named program.
    Computed,
    /// A choice of this house, stated as such.
    Judgement,
    /// Given by the user in the joint file.
    User,
}

/// A catalogue value in SI with its spread and its origin.
#[derive(Clone, Debug, PartialEq)]
pub struct Datum {
    /// Value, SI.
    pub value: f64,
    /// Lowest and highest value met, SI, where known.
    pub range: Option<[f64; 2]>,
    /// How the weight lies in that range.
    pub shape: Shape,
    /// How far it may be trusted.
    pub status: Status,
    /// Source key or sentence.
    pub source: String,
}

/// Kind of a material.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MaterialKind {
    /// A metal.
    Metal,
    /// A brittle solid: ceramic, semiconductor, metal-matrix composite.
    Brittle,
    /// A polymer or fibre composite.
    Polymer,
    /// Graphite.
    Graphite,
}

/// A plate material.
#[derive(Clone, Debug, PartialEq)]
pub struct Material {
    /// Short trade name.
    pub name: String,
    /// Other names it answers to.
    pub aliases: Vec<String>,
    /// Kind.
    pub kind: MaterialKind,
    /// Family for galvanic pairing: `aluminium`, `copper`, `steel`, `stainless`, `silver`, `graphite`, ….
    pub family: String,
    /// Conductivity near 300 K, W/(m K); in the plane of a plate where `through` differs.
    pub conductivity: Datum,
    /// Conductivity against temperature, for the cold.
    pub conductivity_fit: Option<ConductivityFit>,
    /// Conductivity through the thickness of a plate near 300 K, W/(m K), where it differs.
    pub through: Option<Datum>,
    /// Young's modulus, Pa.
    pub youngs_modulus: Datum,
    /// Poisson's ratio, 1.
    pub poisson: Datum,
    /// Linear expansion near 300 K, 1/K.
    pub expansion: Datum,
    /// Integrated contraction from 293 K: (K, fraction), temperature rising.
    pub contraction: Option<Vec<(f64, f64)>>,
    /// Density, kg/m³.
    pub density: Option<Datum>,
    /// Meyer hardness (mean pressure over the projected area), Pa.
    pub hardness: Option<Datum>,
    /// Vickers microhardness c₁ (Pa) and c₂ of `Hv = c₁ (d_v / 1 µm)^c₂`.
    pub microhardness: Option<[f64; 2]>,
    /// Spread of c₁, Pa, where a joint file states one.
    pub microhardness_spread: Option<Datum>,
    /// Yield strength, Pa.
    pub yield_strength: Option<Datum>,
    /// Permissible pressure under a bolt head, Pa.
    pub bearing_limit: Option<Datum>,
    /// Remark.
    pub note: Option<String>,
}

impl Material {
    /// Conductivity through the thickness of a plate over that in its plane, 1; the same at every
    /// temperature.
    pub fn through_ratio(&self) -> f64 {
        let through = self.through.as_ref();
        through.map_or(1.0, |through| through.value / self.conductivity.value)
    }
}

/// A published fit of conductivity against temperature.
#[derive(Clone, Debug, PartialEq)]
pub struct ConductivityFit {
    /// Form of the fit.
    pub form: FitForm,
    /// Coefficients.
    pub coefficients: Vec<f64>,
    /// Valid from and to, K.
    pub valid: [f64; 2],
    /// Source.
    pub source: String,
}

/// Form of a conductivity fit.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum FitForm {
    /// log₁₀ k = Σ cᵢ (log₁₀ T)ⁱ.
    LogPolynomial,
    /// log₁₀ k = (a + c T^½ + e T + g T^1.5 + i T²)/(1 + b T^½ + d T + f T^1.5 + h T²), coefficients a…i in that order.
    CopperRational,
}

/// A surface finish by process.
#[derive(Clone, Debug, PartialEq)]
pub struct FinishRecord {
    /// Name.
    pub name: String,
    /// Other names.
    pub aliases: Vec<String>,
    /// Arithmetic roughness Ra: typical with range, m.
    pub roughness_average: Datum,
    /// Typical out-of-flatness per 100 mm, m.
    pub flatness_per_100mm: Datum,
    /// Remark.
    pub note: Option<String>,
}

/// A thread.
#[derive(Clone, Debug, PartialEq)]
pub struct Thread {
    /// Designation: `M5`, `M10x1.25`, `1/4-28`.
    pub name: String,
    /// Whether inch (unified) rather than ISO metric.
    pub inch: bool,
    /// Nominal diameter, m.
    pub diameter: f64,
    /// Pitch, m.
    pub pitch: f64,
    /// Pitch diameter d₂, m.
    pub pitch_diameter: f64,
    /// Minor diameter of the bolt d₃, m.
    pub minor_diameter: f64,
    /// Minor diameter of the nut D₁, m.
    pub nut_minor_diameter: f64,
    /// Stress diameter d₀, m.
    pub stress_diameter: f64,
    /// Stress area, m².
    pub stress_area: f64,
}

/// A strength grade of bolts.
#[derive(Clone, Debug, PartialEq)]
pub struct Grade {
    /// Name: `8.8`, `A2-70`, `SAE J429 grade 5`.
    pub name: String,
    /// Standard.
    pub standard: String,
    /// Smallest and largest nominal diameter it is given for, m, where the standard limits them.
    pub diameters: Option<[f64; 2]>,
    /// Tensile strength, Pa.
    pub tensile: Datum,
    /// 0.2 % yield, Pa; some grades have none on purpose.
    pub yield_strength: Option<Datum>,
    /// Proof stress, Pa, where the standard defines one.
    pub proof: Option<Datum>,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Expansion, 1/K.
    pub expansion: f64,
    /// Conductivity of the bolt material, W/(m K).
    pub conductivity: Datum,
    /// Catalogue material whose contraction and low-temperature conductivity the bolt follows.
    pub like: String,
}

/// A bolt head, nut or washer as a seat.
#[derive(Clone, Debug, PartialEq)]
pub struct SeatRecord {
    /// `hex`, `socket`, `pan`, `button`, `countersunk`, `nut`, `washer`.
    pub kind: String,
    /// Standard.
    pub standard: String,
    /// Thread designation it belongs to.
    pub thread: String,
    /// Outer diameter of the bearing annulus, m.
    pub outer: f64,
    /// Inner diameter of the bearing annulus, m; none where the hole decides.
    pub inner: Option<f64>,
    /// Height or thickness, m.
    pub height: Option<f64>,
    /// Status of the numbers.
    pub status: Status,
    /// Source.
    pub source: String,
}

/// Clearance holes of one thread.
#[derive(Clone, Debug, PartialEq)]
pub struct ClearanceHole {
    /// Standard.
    pub standard: String,
    /// Thread size it belongs to.
    pub thread: String,
    /// Fine, medium and coarse diameter, m.
    pub diameters: [f64; 3],
    /// How far it may be trusted.
    pub status: Status,
    /// Source.
    pub source: String,
}

/// A friction class or a nut factor by condition.
#[derive(Clone, Debug, PartialEq)]
pub struct FrictionRecord {
    /// Name: `B`, `dry steel on dry steel`.
    pub name: String,
    /// Lowest, nominal, highest.
    pub values: [f64; 3],
    /// Whether the values are nut factors K rather than coefficients μ.
    pub nut_factor: bool,
    /// Surfaces and lubrication it stands for.
    pub describes: String,
    /// Status.
    pub status: Status,
    /// Source.
    pub source: String,
}

/// A tightening method with its scatter.
#[derive(Clone, Debug, PartialEq)]
pub struct MethodRecord {
    /// Name.
    pub name: String,
    /// Family: `VDI 2230`, `NASA`, `handbook`.
    pub family: String,
    /// Half-width of the scatter, least and most, as a fraction of the mean.
    pub scatter: [f64; 2],
    /// Status.
    pub status: Status,
    /// Source.
    pub source: String,
}

/// A gas.
#[derive(Clone, Debug, PartialEq)]
pub struct Gas {
    /// Name.
    pub name: String,
    /// Temperatures of the tables, K, rising.
    pub temperatures: Vec<f64>,
    /// Conductivity, W/(m K).
    pub conductivity: Vec<f64>,
    /// Mean free path at 101 325 Pa, m.
    pub mean_free_path: Vec<f64>,
    /// Prandtl number, 1.
    pub prandtl: Vec<f64>,
    /// Ratio of specific heats, 1.
    pub heat_ratio: Vec<f64>,
    /// Thermal accommodation at engineering metal walls, 1.
    pub accommodation: Datum,
    /// How far the tables may be trusted.
    pub status: Status,
    /// Source of the tables.
    pub source: String,
}

/// A filler of generic kind.
#[derive(Clone, Debug, PartialEq)]
pub struct FillerRecord {
    /// Name.
    pub name: String,
    /// Other names.
    pub aliases: Vec<String>,
    /// `fluid`, `paste`, `layer`.
    pub model: String,
    /// Conductivity, W/(m K).
    pub conductivity: Datum,
    /// Yield stress of a paste, Pa.
    pub yield_stress: Option<Datum>,
    /// Thickness as supplied or applied, m.
    pub thickness: Option<Datum>,
    /// Thinnest bond line of a paste: its largest particles, m.
    pub thinnest: Option<Datum>,
    /// Modulus of a layer under pressure over its whole face, Pa.
    pub modulus: Option<Datum>,
    /// Hardness of a foil that yields under asperities, Pa.
    pub hardness: Option<Datum>,
    /// Density, kg/m³.
    pub density: Option<Datum>,
    /// (pressure, Pa; area resistance, m² K/W).
    pub points: Vec<(f64, f64)>,
    /// Whether it creeps so that bolts need tightening again.
    pub creeps: bool,
    /// Whether it holds silicone, which migrates and outgasses in vacuum.
    pub silicone: bool,
    /// Whether it insulates electrically.
    pub insulates: bool,
    /// Status.
    pub status: Status,
    /// Source.
    pub source: String,
    /// Remark.
    pub note: Option<String>,
}

/// A plating or film.
#[derive(Clone, Debug, PartialEq)]
pub struct Plating {
    /// Name.
    pub name: String,
    /// Other names.
    pub aliases: Vec<String>,
    /// Metal, or film (oxide, conversion coat).
    pub metal: bool,
    /// Conductivity, W/(m K).
    pub conductivity: Datum,
    /// Hardness, Pa.
    pub hardness: Option<Datum>,
    /// Thickness taken when the file states none, m.
    pub typical_thickness: Datum,
    /// Galvanic family: `silver`, `gold`, `tin`, `zinc`, `cadmium`, ….
    pub family: String,
    /// Remark.
    pub note: Option<String>,
}
