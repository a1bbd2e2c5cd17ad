//! Results as JSON: a contract whose keys may be added to, never changed. SI, unrounded.

use crate::{
    diagnostic::{Assumption, Caution},
    estimate::{
        Band, Bend, Bent, BoltResult, CaseResult, Estimate, InterfaceResult, Met, PlaneResult,
        RequirementResult, RingRow, Sampling, TorqueSweep, Worst,
    },
    joint::{Limit, Plane, RequirementKind},
    report::{media::vacuum_over, number::inverse, text::left_out},
    uncertainty::{InMedium, Verification},
};
use serde_json::{Map, Value, json};

mod comparison;
mod pressure;
mod temperatures;
mod window;

pub use comparison::comparison;
pub(super) use pressure::differences;

/// Number of the file format and of this contract.
pub const FORMAT: u32 = 1;

/// Everything `estimate` found. A value that does not apply is null, as is one that is not finite.
pub fn estimate(estimate: &Estimate) -> Value {
    let mut object = estimate.cases.first().map_or_else(Map::new, case);
    // One case is told once, at the top level; the list is for hot beside cold.
    let cases: Vec<Value> = if estimate.cases.len() > 1 {
        estimate
            .cases
            .iter()
            .map(|each| Value::Object(case(each)))
            .collect()
    } else {
        Vec::new()
    };
    for (key, value) in [
        ("ringsum", json!(env!("CARGO_PKG_VERSION"))),
        ("units", json!("SI")),
        ("format", json!(FORMAT)),
        ("title", json!(estimate.title)),
        ("seed", json!(estimate.seed)),
        ("draws", json!(estimate.draws)),
        ("field", json!(estimate.field)),
        ("resolution", json!(estimate.resolution)),
        (
            "planes",
            json!({ "source": estimate.source_plane, "sink": estimate.sink_plane }),
        ),
        ("heat", json!(estimate.heat)),
        ("without", json!(left_out(estimate))),
        ("bolts_scatter", json!(estimate.bolts_scatter)),
        ("requirement", worst(estimate)),
        ("cases", json!(cases)),
        ("cautions", cautions(&estimate.cautions)),
        ("assumptions", assumptions(&estimate.assumptions)),
    ] {
        object.insert(key.to_owned(), value);
    }
    Value::Object(object)
}

/// The requirement at its worst case.
fn worst(estimate: &Estimate) -> Value {
    estimate
        .requirement()
        .map_or(Value::Null, |(case, result)| {
            let mut object = requirement(result);
            object["case"] = json!(case);
            object
        })
}

/// The part of the contract that one thermal case fills.
fn case(case: &CaseResult) -> Map<String, Value> {
    let results = &case.results;
    let mut object = Map::new();
    for (key, value) in [
        ("case", json!(case.name)),
        ("sink_temperature", json!(case.sink_temperature)),
        ("sink_radiates", json!(case.sink_radiates)),
        ("bolts", case.bolts.iter().map(bolt).collect()),
        ("pressure", pressure::pressure(case)),
        (
            "interfaces",
            case.interfaces.iter().map(interface).collect(),
        ),
        ("footprint", json!(case.footprint)),
        (
            "results",
            json!({
                "contact": plane(&results.contact, case.footprint),
                "node_to_node": plane(&results.node_to_node, case.footprint),
                "added_by_joint": plane(&results.added_by_joint, case.footprint),
                "source_to_sink": plane(&results.source_to_sink, case.footprint),
                "perfect_contact": plane(&results.perfect_contact, case.footprint),
            }),
        ),
        (
            "bounds",
            json!({
                "resistance_lower": case.resistance_lower,
                "resistance_upper": case.resistance_upper,
            }),
        ),
        ("worst", case.worst.as_ref().map_or(Value::Null, worst_cases)),
        ("numerical_error", json!(case.numerical_error)),
        ("draw_error", json!(case.draw_error)),
        ("sampling", case.sampling.as_ref().map_or(Value::Null, sampling)),
        ("bent", case.bent.as_ref().map_or(Value::Null, bent)),
        ("rise", rise(case)),
        ("temperatures", temperatures::temperatures(case)),
        (
            "requirement",
            case.requirement.as_ref().map_or(Value::Null, requirement),
        ),
        (
            "drivers",
            case.drivers
                .iter()
                .map(|driver| {
                    json!({ "input": driver.input, "share": driver.share, "remedy": driver.remedy })
                })
                .collect(),
        ),
    ] {
        object.insert(key.to_owned(), value);
    }
    object
}

/// Draws solved beside their surfaces; nothing on the cone.
pub fn verification(found: Option<&Verification>) -> Value {
    found.map_or(Value::Null, |found| {
        json!({ "draws": found.draws, "largest_error": found.largest, "mean_error": found.mean })
    })
}

/// Standard errors of low and high, K/W, and source to sink on the way to all draws.
fn sampling(sampling: &Sampling) -> Value {
    json!({
        "scrambles": sampling.scrambles,
        "standard_error": {
            "contact": sampling.contact,
            "node_to_node": sampling.node_to_node,
            "added_by_joint": sampling.added_by_joint,
            "source_to_sink": sampling.source_to_sink,
        },
        "source_to_sink": sampling.course.iter().map(|point| {
            json!({ "draws": point.draws, "low": point.low, "high": point.high })
        }).collect::<Vec<Value>>(),
    })
}

/// Ends by the way the faces are bent.
fn bent(bent: &Bent) -> Value {
    let ways = Bend::ALL.iter().zip(bent.0);
    ways.map(|(way, [low, high])| (way.name().to_owned(), json!({ "low": low, "high": high })))
        .collect::<Map<String, Value>>()
        .into()
}

/// Resistances with every input at its unfavourable end, K/W.
fn worst_cases(worst: &Worst) -> Value {
    let ends = |[low, high]: [f64; 2]| json!({ "low": low, "high": high });
    json!({
        "contact": ends(worst.contact),
        "node_to_node": ends(worst.node_to_node),
        "added_by_joint": ends(worst.added_by_joint),
        "source_to_sink": ends(worst.source_to_sink),
    })
}

fn bolt(bolt: &BoltResult) -> Value {
    json!({
        "at": bolt.at,
        "missing": bolt.missing,
        "force": band(&bolt.force),
        "force_in_service": band(&bolt.force_in_service),
        "strength_use": strength_use(bolt.strength_use),
        "use_in_service": bolt.use_in_service,
        "axial": bolt.axial.as_ref().map(window::axial),
        "largest_torque": bolt.largest_torque,
        "contact_radius": bolt.contact_radius,
        "contact_conductance": bolt.contact_conductance,
    })
}

/// An interface at nominal inputs; the drop is per watt through the joint.
fn interface(interface: &InterfaceResult) -> Value {
    json!({
        "plates": interface.plates,
        "contact_conductance": interface.contact,
        "force": interface.force,
        "peak": interface.peak,
        "contact_area": interface.contact_area,
        "gap_max": interface.gap_max,
        "drop_per_watt": interface.drop,
    })
}

fn strength_use(values: Option<[f64; 2]>) -> Value {
    values.map_or(
        Value::Null,
        |[nominal, high]| json!({ "nominal": nominal, "high": high }),
    )
}

fn band(band: &Band) -> Value {
    json!({ "low": band.low, "nominal": band.nominal, "high": band.high })
}

fn plane(result: &PlaneResult, footprint: f64) -> Value {
    let [low, nominal, high] = inverse(&result.resistance);
    let per_area = |value: Option<f64>| value.map(|value| value / footprint);
    json!({
        "resistance": band(&result.resistance),
        "conductance": { "low": low, "nominal": nominal, "high": high },
        "conductance_per_area": {
            "low": per_area(low), "nominal": per_area(nominal), "high": per_area(high),
        },
    })
}

fn rise(case: &CaseResult) -> Value {
    case.rise.map_or(Value::Null, |rise| {
        json!({
            "low": rise.source.low,
            "nominal": rise.source.nominal,
            "high": rise.source.high,
            "hottest": rise.hottest.nominal,
            "hottest_band": band(&rise.hottest),
            "interface_drop": band(&rise.interface_drop),
            "coolant_drop": rise.coolant_drop,
            "coolant_drop_ends": rise.coolant_drop_ends,
            "above_coolant": rise.above_coolant.as_ref().map(|[source, hottest]| {
                json!({ "source": band(source), "hottest": band(hottest) })
            }),
        })
    })
}

fn requirement(requirement: &RequirementResult) -> Value {
    let (kind, plane) = match requirement.kind {
        RequirementKind::Rise => ("rise", None),
        RequirementKind::HottestRise => ("hottest_rise", None),
        RequirementKind::AboveCoolant => ("rise_above_coolant", None),
        RequirementKind::HottestAboveCoolant => ("hottest_rise_above_coolant", None),
        RequirementKind::InterfaceDrop => ("interface_drop", None),
        RequirementKind::Resistance(plane) => ("resistance", Some(plane)),
        RequirementKind::Conductance(plane) => ("conductance", Some(plane)),
    };
    json!({
        "kind": kind,
        "plane": plane.map(plane_key),
        "limit": requirement.limit,
        "bound": bound_key(requirement.bound),
        "value": requirement.value,
        "bent": requirement.bent.as_ref().map_or(Value::Null, bent),
        "held_against": requirement
            .bent
            .and_then(|bent| bent.worst(requirement.bound))
            .map(Bend::name),
        "met": match requirement.met {
            Met::Yes => json!(true),
            Met::No => json!(false),
            Met::Uncertain => json!("uncertain"),
        },
    })
}

fn plane_key(plane: Plane) -> &'static str {
    match plane {
        Plane::Contact => "contact",
        Plane::NodeToNode => "node_to_node",
        Plane::AddedByJoint => "added_by_joint",
        Plane::SourceToSink => "source_to_sink",
    }
}

fn bound_key(bound: Limit) -> &'static str {
    match bound {
        Limit::Most => "most",
        Limit::Least => "least",
    }
}

/// Cautions with their codes.
pub(crate) fn cautions(cautions: &[Caution]) -> Value {
    cautions
        .iter()
        .map(|caution| json!({ "code": caution.code, "text": caution.text }))
        .collect()
}

fn assumptions(assumptions: &[Assumption]) -> Value {
    assumptions
        .iter()
        .map(|each| json!({ "field": each.field, "value": each.value, "why": each.why }))
        .collect()
}

/// The same joint in several media.
pub fn media(media: &[InMedium]) -> Value {
    let row = |each: &InMedium| {
        json!({
            "medium": each.medium.word(),
            "pressure": each.medium.pressure(),
            "source_to_sink": { "resistance": band(&each.source_to_sink) },
            "added_by_joint": { "resistance": band(&each.added_by_joint) },
            "rise": each.rise.as_ref().map(band),
            "vacuum_over_medium": vacuum_over(media, each),
        })
    };
    media.iter().map(row).collect()
}

/// The rings of every bolt: radii in m, pressure in Pa, conductances in W/(m² K) and W/K.
pub fn rings(tables: &[Vec<RingRow>]) -> Value {
    let row = |ring: &RingRow| {
        json!({
            "inner_radius": ring.radius[0],
            "outer_radius": ring.radius[1],
            "area": ring.area,
            "pressure": ring.pressure,
            "conductance_per_area": ring.conductance,
            "conductance": ring.share,
            "cumulative": ring.cumulative,
        })
    };
    tables
        .iter()
        .map(|rings| rings.iter().map(row).collect::<Value>())
        .collect()
}

/// Resistance against torque.
pub fn torque(sweep: &TorqueSweep) -> Value {
    let points: Vec<Value> = sweep
        .points
        .iter()
        .map(|point| {
            json!({
                "torque": point.torque,
                "force": band(&point.force),
                "source_to_sink": { "resistance": band(&point.source_to_sink) },
                "contact": { "resistance": band(&point.contact) },
                "added_by_joint": { "resistance": band(&point.added_by_joint) },
                "strength_use": strength_use(point.strength_use),
                "passes": point.passes,
            })
        })
        .collect();
    json!({
        "ringsum": env!("CARGO_PKG_VERSION"),
        "units": "SI",
        "format": FORMAT,
        "title": sweep.title,
        "group": sweep.group,
        "case": sweep.case,
        "field": sweep.field,
        "resolution": sweep.resolution,
        "stated": sweep.stated,
        "stated_stands": {
            "inside": sweep
                .window
                .both
                .map(|both| both.low.torque <= sweep.stated && sweep.stated <= both.high.torque),
            "breaks": window::limits(&sweep.window.broken_at(sweep.stated)),
            "requirement_met": sweep.window.heat_met_at(sweep.stated),
        },
        "bends": sweep.bends,
        "largest": sweep.largest.map(|(torque, limit)| json!({ "torque": torque, "limit": limit })),
        "best": sweep.best,
        "minimum": sweep.minimum.map(|minimum| json!({
            "torque": minimum.torque,
            "source_to_sink": minimum.source_to_sink,
            "added_by_joint": minimum.added_by_joint,
        })),
        "at_stated": { "source_to_sink": sweep.at_stated },
        "at_limit": sweep.at_limit.map(|limit| json!({
            "torque": limit.torque,
            "source_to_sink": limit.source_to_sink,
            "added_by_joint": limit.added_by_joint,
        })),
        "required": sweep.required.map(|(resistance, bound)| {
            json!({ "resistance": resistance, "bound": bound_key(bound) })
        }),
        "points": points,
        "window": window::window(&sweep.window),
        "cautions": cautions(&sweep.cautions),
    })
}
