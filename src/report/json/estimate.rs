//! One joint as JSON: its cases with forces, pressure, resistances, temperatures and the requirement.

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    estimate::{
        self, Bend, Bent, BoltResult, CaseResult, InterfaceResult, Met, PlaneResult,
        RequirementResult, Sampling, Worst,
    },
    joint::RequirementKind,
    report::{
        json::{
            beside::{MediumTold, RingTold, VerificationTold},
            pressure::{self, PressureTold},
            shapes::{
                AssumptionTold, CautionTold, ConductanceEnds, Ends, ForceEnds, HEAD, Head, LowHigh,
                StrengthUse, assumptions, bound, cautions, plane_key,
            },
            temperatures::{self, TemperaturesTold},
            window::{self, AxialTold},
        },
        number::inverse,
        text::left_out,
    },
};

/// What `estimate --json` prints of a joint. Its first case stands at the top level.
#[derive(Serialize, JsonSchema)]
pub struct EstimateResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The joint file; missing inside a comparison
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "String")]
    file: Option<String>,
    /// The variant of the file; there with --variant
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "String")]
    variant: Option<String>,
    /// Title of the joint
    title: String,
    /// Seed of the draws
    seed: u64,
    /// Number of draws; 0 means nominal values alone
    draws: u32,
    /// The field of pressure
    #[schemars(extend("enum" = ["elastic", "cone"]))]
    field: &'static str,
    /// How finely it is solved
    #[schemars(extend("enum" = ["fast", "normal", "fine"]))]
    resolution: &'static str,
    /// The planes between which source to sink lies
    planes: PlaneNames,
    /// Heat through the joint, W; null where none is stated
    heat: Option<f64>,
    /// Numbers of the bolts that are left out, counted from 1 in the order of the file
    without: Vec<usize>,
    /// How the bolts scatter together, in words
    bolts_scatter: String,
    #[serde(flatten)]
    #[schemars(with = "CaseBody")]
    first: Option<CaseBody>,
    /// The requirement in the case that stands worst to it; null where none is stated
    requirement: Option<WorstRequirement>,
    /// All cases where there are several; empty where the one case stands at the top level
    cases: Vec<CaseTold>,
    /// Cautions, the gravest first
    cautions: Vec<CautionTold>,
    /// What the file does not state
    assumptions: Vec<AssumptionTold>,
    /// Rings of every bolt, from inside out; there with --rings
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "Vec<Vec<RingTold>>")]
    rings: Option<Vec<Vec<RingTold>>>,
    /// The joint in other media; there with --media
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "Vec<MediumTold>")]
    media: Option<Vec<MediumTold>>,
    /// Draws solved beside their surfaces; there with --verify, null on the cone
    #[serde(skip_serializing_if = "Option::is_none")]
    verification: Option<VerificationTold>,
}

/// Names of two planes.
#[derive(Serialize, JsonSchema)]
struct PlaneNames {
    /// Where the heat enters
    source: String,
    /// Where it leaves
    sink: String,
}

/// A thermal case.
#[derive(Serialize, JsonSchema)]
struct CaseTold {
    #[serde(flatten)]
    body: CaseBody,
    /// The requirement in this case; null where none is stated
    requirement: Option<RequirementTold>,
}

/// What every thermal case tells.
#[derive(Serialize, JsonSchema)]
struct CaseBody {
    /// The thermal case
    #[schemars(extend("enum" = ["service", "hot", "cold"]))]
    case: &'static str,
    /// Mean temperature of the sink surface, K
    sink_temperature: f64,
    /// Whether the sink surface radiates, so that its temperature follows from the heat
    sink_radiates: bool,
    /// Every bolt in the order of the file
    bolts: Vec<BoltTold>,
    /// The pressure between the faces; in a stack that of the first interface
    pressure: PressureTold,
    /// Every interface, from warm to cold
    interfaces: Vec<InterfaceTold>,
    /// Area of the faying faces, m²; in a stack that of the first interface
    footprint: f64,
    /// The resistances between named planes
    results: ResultsTold,
    /// Bounds of source to sink that are proved for the field used
    bounds: BoundsTold,
    /// Least and most with every input at its unfavourable end; null without draws, and where an end has no number
    worst: Option<WorstTold>,
    /// Error of the solution, relative to source to sink
    numerical_error: f64,
    /// Largest error of the surface that the draws are read from, relative to source to sink; null where every draw is solved, and without draws
    draw_error: Option<f64>,
    /// How well the draws know low and high; null without draws, and with too few to tell
    sampling: Option<SamplingTold>,
    /// Source to sink by the way the faces are bent, K/W; null where their way is known or they are flat, and without draws
    bent: Option<BentTold>,
    /// Temperature rises above the mean sink surface; null where no heat is stated
    rise: Option<RiseTold>,
    /// Temperatures of the solved heat; null for the cone, which solves none
    temperatures: Option<TemperaturesTold>,
    /// Inputs by their share of the variance of source to sink, largest first; empty without draws
    drivers: Vec<DriverTold>,
}

/// A bolt.
#[derive(Serialize, JsonSchema)]
struct BoltTold {
    /// Place in joint coordinates, m
    at: [f64; 2],
    /// Whether it is left out, so that its hole alone is there
    missing: bool,
    /// Clamp force at assembly, N
    force: ForceEnds,
    /// Clamp force in service, N
    force_in_service: ForceEnds,
    /// Stress over yield at assembly; null without a yield strength
    strength_use: Option<StrengthUse>,
    /// Stress over yield in service at the worst case, share of 1; null without a yield strength
    use_in_service: Option<f64>,
    /// What a load along the bolt does; null where none is stated
    axial: Option<AxialTold>,
    /// Largest torque that passes every limit, N m; null where a preload is given
    largest_torque: Option<f64>,
    /// Radius where contact ends, m
    contact_radius: f64,
    /// Ring sum of this bolt, W/K
    contact_conductance: f64,
}

/// An interface at nominal inputs.
#[derive(Serialize, JsonSchema)]
struct InterfaceTold {
    /// Names of the plates that meet there, the warm one first
    plates: [String; 2],
    /// Ring sum, W/K
    contact_conductance: f64,
    /// Force carried, N
    force: f64,
    /// Highest pressure, Pa
    peak: f64,
    /// Area in contact, m²
    contact_area: f64,
    /// Widest gap, m; null for the cone, which knows none
    gap_max: Option<f64>,
    /// Mean drop per watt through the joint, K/W
    drop_per_watt: f64,
}

/// Resistances between named planes.
#[derive(Serialize, JsonSchema)]
struct ResultsTold {
    /// Faying faces alone: ring sum, in a stack those of all interfaces in series
    contact: PlaneTold,
    /// Mean of the first plate to mean of the last
    node_to_node: PlaneTold,
    /// What the joint adds to the same path with perfect contact
    added_by_joint: PlaneTold,
    /// Heated zone to sink surface
    source_to_sink: PlaneTold,
    /// The same path with perfect contact
    perfect_contact: PlaneTold,
}

/// One result in three forms.
#[derive(Serialize, JsonSchema)]
struct PlaneTold {
    /// Resistance, K/W
    resistance: Ends,
    /// Conductance, W/K
    conductance: ConductanceEnds,
    /// Conductance over the area of the faying faces, W/(m² K)
    conductance_per_area: ConductanceEnds,
}

/// Bounds of source to sink.
#[derive(Serialize, JsonSchema)]
struct BoundsTold {
    /// Lower bound, K/W; null where none is proved
    resistance_lower: Option<f64>,
    /// Upper bound, K/W; null but for single round joints on the cone
    resistance_upper: Option<f64>,
}

/// Least and most with every input at its unfavourable end.
#[derive(Serialize, JsonSchema)]
struct WorstTold {
    /// Faying faces alone, K/W
    contact: LowHigh,
    /// Mean of the first plate to mean of the last, K/W
    node_to_node: LowHigh,
    /// What the joint adds, K/W
    added_by_joint: LowHigh,
    /// Heated zone to sink surface, K/W
    source_to_sink: LowHigh,
}

/// How well the draws know the ends of the bands.
#[derive(Serialize, JsonSchema)]
struct SamplingTold {
    /// Independent scramblings among which the draws are divided
    scrambles: usize,
    /// Standard errors of low and high
    standard_error: StandardErrors,
    /// Source to sink after a fourth, a half and all of the draws
    source_to_sink: Vec<CheckpointTold>,
}

/// Standard errors of low and high.
#[derive(Serialize, JsonSchema)]
struct StandardErrors {
    /// Faying faces alone: of low and of high, K/W
    contact: [f64; 2],
    /// Mean of the first plate to mean of the last: of low and of high, K/W
    node_to_node: [f64; 2],
    /// What the joint adds: of low and of high, K/W
    added_by_joint: [f64; 2],
    /// Heated zone to sink surface: of low and of high, K/W
    source_to_sink: [f64; 2],
}

/// The ends of a band after so many draws.
#[derive(Serialize, JsonSchema)]
struct CheckpointTold {
    /// Draws so far
    draws: usize,
    /// 5 % quantile, K/W
    low: f64,
    /// 95 % quantile, K/W
    high: f64,
}

/// Ends by the way the faces are bent, in the unit of the number they are of.
#[derive(Serialize, JsonSchema)]
struct BentTold {
    /// Faces open at the edge
    convex: LowHigh,
    /// Flat faces
    flat: LowHigh,
    /// Faces open in the middle
    concave: LowHigh,
}

/// Temperature rises above the mean sink surface.
#[derive(Serialize, JsonSchema)]
struct RiseTold {
    /// Mean of the source, 5 % quantile, K; null without draws
    low: Option<f64>,
    /// Mean of the source at nominal inputs, K
    nominal: f64,
    /// Mean of the source, 95 % quantile, K; null without draws
    high: Option<f64>,
    /// Hottest point of the first plate at nominal inputs, K
    hottest: f64,
    /// Hottest point of the first plate, K
    hottest_band: Ends,
    /// Mean drop across the interface, in a stack the sum over all, K
    interface_drop: Ends,
    /// Drop from the sink surface to the coolant, K; null where there is no film
    coolant_drop: Option<f64>,
    /// Its low and high, K; null where neither film nor heat has a spread
    coolant_drop_ends: Option<[f64; 2]>,
    /// Rises above the coolant; null where there is no film
    above_coolant: Option<AboveCoolant>,
}

/// Rises above the coolant.
#[derive(Serialize, JsonSchema)]
struct AboveCoolant {
    /// Mean of the source, K
    source: Ends,
    /// Hottest point of the first plate, K
    hottest: Ends,
}

/// A requirement at its worst case.
#[derive(Serialize, JsonSchema)]
struct WorstRequirement {
    /// The case
    #[schemars(extend("enum" = ["service", "hot", "cold"]))]
    case: &'static str,
    /// Why `met` is of heat alone: a limit of strength, a load that parts the faces, or scatter that leaves next
    /// to no clamp force; null where none of these lets the joint down
    of_heat_alone: Option<&'static str>,
    #[serde(flatten)]
    requirement: RequirementTold,
}

/// A requirement and how the joint stands to it.
#[derive(Serialize, JsonSchema)]
struct RequirementTold {
    /// The limited quantity
    #[schemars(extend("enum" = [
        "rise", "hottest_rise", "rise_above_coolant", "hottest_rise_above_coolant", "interface_drop",
        "resistance", "conductance"
    ]))]
    kind: &'static str,
    /// The planes of a limited resistance or conductance; null for temperatures
    #[schemars(extend("enum" = ["contact", "node_to_node", "added_by_joint", "source_to_sink", null]))]
    plane: Option<&'static str>,
    /// The limit: K, K/W or W/K
    limit: f64,
    /// Side of the limit
    #[schemars(extend("enum" = ["most", "least"]))]
    bound: &'static str,
    /// The value that is compared, the unfavourable end where there is one: K, K/W or W/K
    value: f64,
    /// Ends of the value by the way the faces are bent: K, K/W or W/K; null as that of the case
    bent: Option<BentTold>,
    /// The way that decides; null where the ways hardly differ or are not told
    #[schemars(extend("enum" = ["convex", "flat", "concave", null]))]
    held_against: Option<&'static str>,
    /// Whether the joint meets it; uncertain where it does at nominal but not at the unfavourable end, or where none was drawn
    #[schemars(extend("enum" = [true, false, "uncertain"]))]
    #[schemars(with = "Value")]
    met: Value,
}

/// An input and its share of the spread.
#[derive(Serialize, JsonSchema)]
struct DriverTold {
    /// The input
    input: &'static str,
    /// Share of the variance, 0 to 1
    share: f64,
    /// What to do about it
    remedy: &'static str,
}

/// Everything `estimate` found. A value that does not apply is null, as is one that is not finite.
pub fn estimate(estimate: &estimate::Estimate) -> Value {
    json!(told(estimate))
}

/// The same before it is text.
pub(super) fn told(estimate: &estimate::Estimate) -> EstimateResult {
    // One case is told once, at the top level; the list is for hot beside cold.
    let cases = if estimate.cases.len() > 1 {
        estimate.cases.iter().map(case).collect()
    } else {
        Vec::new()
    };
    let worst = estimate.requirement();
    EstimateResult {
        head: HEAD,
        file: None,
        variant: None,
        title: estimate.title.clone(),
        seed: estimate.seed,
        draws: estimate.draws,
        field: estimate.field,
        resolution: estimate.resolution,
        planes: PlaneNames {
            source: estimate.source_plane.clone(),
            sink: estimate.sink_plane.clone(),
        },
        heat: estimate.heat,
        without: left_out(estimate),
        bolts_scatter: estimate.bolts_scatter.clone(),
        first: estimate.cases.first().map(body),
        requirement: worst.map(|(case, result)| WorstRequirement {
            case,
            of_heat_alone: estimate.met_of_heat_alone(),
            requirement: requirement(result),
        }),
        cases,
        cautions: cautions(&estimate.cautions),
        assumptions: assumptions(&estimate.assumptions),
        rings: None,
        media: None,
        verification: None,
    }
}

fn case(case: &CaseResult) -> CaseTold {
    CaseTold {
        body: body(case),
        requirement: case.requirement.as_ref().map(requirement),
    }
}

/// The part of the contract that one thermal case fills.
fn body(case: &CaseResult) -> CaseBody {
    let results = &case.results;
    let plane = |result: &PlaneResult| plane(result, case.footprint);
    CaseBody {
        case: case.name,
        sink_temperature: case.sink_temperature,
        sink_radiates: case.sink_radiates,
        bolts: case.bolts.iter().map(bolt).collect(),
        pressure: pressure::pressure(case),
        interfaces: case.interfaces.iter().map(interface).collect(),
        footprint: case.footprint,
        results: ResultsTold {
            contact: plane(&results.contact),
            node_to_node: plane(&results.node_to_node),
            added_by_joint: plane(&results.added_by_joint),
            source_to_sink: plane(&results.source_to_sink),
            perfect_contact: plane(&results.perfect_contact),
        },
        bounds: BoundsTold {
            resistance_lower: case.resistance_lower,
            resistance_upper: case.resistance_upper,
        },
        worst: case.worst.as_ref().map(worst_cases),
        numerical_error: case.numerical_error,
        draw_error: case.draw_error,
        sampling: case.sampling.as_ref().map(sampling),
        bent: case.bent.as_ref().map(bent),
        rise: rise(case),
        temperatures: temperatures::temperatures(case),
        drivers: case
            .drivers
            .iter()
            .map(|driver| DriverTold {
                input: driver.input,
                share: driver.share,
                remedy: driver.remedy,
            })
            .collect(),
    }
}

/// Standard errors of low and high, K/W, and source to sink on the way to all draws.
fn sampling(sampling: &Sampling) -> SamplingTold {
    SamplingTold {
        scrambles: sampling.scrambles,
        standard_error: StandardErrors {
            contact: sampling.contact,
            node_to_node: sampling.node_to_node,
            added_by_joint: sampling.added_by_joint,
            source_to_sink: sampling.source_to_sink,
        },
        source_to_sink: sampling
            .course
            .iter()
            .map(|point| CheckpointTold {
                draws: point.draws,
                low: point.low,
                high: point.high,
            })
            .collect(),
    }
}

/// Ends by the way the faces are bent, in the order of `Bend::ALL`.
fn bent(bent: &Bent) -> BentTold {
    let [convex, flat, concave] = bent.0.map(LowHigh::from);
    BentTold {
        convex,
        flat,
        concave,
    }
}

/// Resistances with every input at its unfavourable end, K/W.
fn worst_cases(worst: &Worst) -> WorstTold {
    WorstTold {
        contact: worst.contact.into(),
        node_to_node: worst.node_to_node.into(),
        added_by_joint: worst.added_by_joint.into(),
        source_to_sink: worst.source_to_sink.into(),
    }
}

fn bolt(bolt: &BoltResult) -> BoltTold {
    BoltTold {
        at: bolt.at,
        missing: bolt.missing,
        force: (&bolt.force).into(),
        force_in_service: (&bolt.force_in_service).into(),
        strength_use: bolt.strength_use.map(StrengthUse::from),
        use_in_service: bolt.use_in_service,
        axial: bolt.axial.as_ref().map(window::axial),
        largest_torque: bolt.largest_torque,
        contact_radius: bolt.contact_radius,
        contact_conductance: bolt.contact_conductance,
    }
}

/// An interface at nominal inputs; the drop is per watt through the joint.
fn interface(interface: &InterfaceResult) -> InterfaceTold {
    InterfaceTold {
        plates: interface.plates.clone(),
        contact_conductance: interface.contact,
        force: interface.force,
        peak: interface.peak,
        contact_area: interface.contact_area,
        gap_max: interface.gap_max,
        drop_per_watt: interface.drop,
    }
}

fn plane(result: &PlaneResult, footprint: f64) -> PlaneTold {
    let conductance = inverse(&result.resistance);
    PlaneTold {
        resistance: (&result.resistance).into(),
        conductance: conductance.into(),
        conductance_per_area: conductance
            .map(|value| value.map(|value| value / footprint))
            .into(),
    }
}

fn rise(case: &CaseResult) -> Option<RiseTold> {
    case.rise.map(|rise| RiseTold {
        low: rise.source.low,
        nominal: rise.source.nominal,
        high: rise.source.high,
        hottest: rise.hottest.nominal,
        hottest_band: (&rise.hottest).into(),
        interface_drop: (&rise.interface_drop).into(),
        coolant_drop: rise.coolant_drop,
        coolant_drop_ends: rise.coolant_drop_ends,
        above_coolant: rise
            .above_coolant
            .as_ref()
            .map(|[source, hottest]| AboveCoolant {
                source: source.into(),
                hottest: hottest.into(),
            }),
    })
}

fn requirement(requirement: &RequirementResult) -> RequirementTold {
    let (kind, plane) = match requirement.kind {
        RequirementKind::Rise => ("rise", None),
        RequirementKind::HottestRise => ("hottest_rise", None),
        RequirementKind::AboveCoolant => ("rise_above_coolant", None),
        RequirementKind::HottestAboveCoolant => ("hottest_rise_above_coolant", None),
        RequirementKind::InterfaceDrop => ("interface_drop", None),
        RequirementKind::Resistance(plane) => ("resistance", Some(plane)),
        RequirementKind::Conductance(plane) => ("conductance", Some(plane)),
    };
    RequirementTold {
        kind,
        plane: plane.map(plane_key),
        limit: requirement.limit,
        bound: bound(requirement.bound),
        value: requirement.value,
        bent: requirement.bent.as_ref().map(bent),
        held_against: requirement
            .bent
            .and_then(|bent| bent.worst(requirement.bound))
            .map(Bend::name),
        met: match requirement.met {
            Met::Yes => json!(true),
            Met::No => json!(false),
            Met::Uncertain => json!("uncertain"),
        },
    }
}
