//! Medium, temperatures, heat, requirement.

use crate::{
    catalog,
    joint::{
        Case, Limit, Medium, Plane, Requirement, RequirementKind, Service,
        collector::{Collector, Wording, fault},
        cooling::Back,
        heating,
        plates::two_ways,
        record::Record,
        sections::{PLANES, RISES},
        tree::short,
        walk::missing,
    },
};

/// 20 °C, K.
const ROOM: f64 = 293.15;

/// Standard atmosphere, Pa.
pub(super) const ATMOSPHERE: f64 = 101_325.0;

/// Reads `[service]`, with the heat of the joint and what the cooled back of the last plate says
/// of its temperature, which may stand in place of that of the service.
pub(super) fn read(
    file: &Record,
    (heat, back): (Option<f64>, Option<&Back>),
    collector: &mut Collector,
) -> Option<Service> {
    let record = file.record("service")?;
    let medium = medium(record, collector);
    let temperatures = temperatures(record, (heat, back), collector);
    let require = require(file, record, collector);
    let (cases, assembly_temperature) = temperatures?;
    Some(Service {
        medium: medium?,
        cases,
        assembly_temperature,
        heat,
        require: require?,
    })
}

fn medium(record: &Record, collector: &mut Collector) -> Option<Medium> {
    let name = record.text("medium")?;
    if name.eq_ignore_ascii_case("vacuum") {
        collector.require(!record.has("pressure"), || {
            fault(
                "file/conflict",
                &record.span("pressure"),
                "a vacuum has no gas pressure: it is calculated with no gas at all",
            )
            .expecting("expected without `pressure`")
            .help("leave `pressure` out, or name the gas that is left: `medium = \"air\"`")
        });
        return Some(Medium::Vacuum);
    }
    let Some(gas) = catalog::gas(name) else {
        let known = catalog::gases().iter().map(|gas| gas.name.as_str());
        let names: Vec<String> = known.clone().map(str::to_lowercase).collect();
        collector.report(
            fault(
                "name/unknown",
                &record.span("medium"),
                format!("no medium is called `{}`", short(name)),
            )
            .expecting("expected `vacuum` or a gas")
            .help(format!("known are vacuum, {}", names.join(", ")))
            .nearest(name, known.chain(std::iter::once("vacuum"))),
        );
        return None;
    };
    let pressure = if let Some(pressure) = record.number("pressure") {
        pressure
    } else {
        if !record.has("pressure") {
            collector.assume(record.at("pressure"), "101 325 Pa", "not stated");
        }
        ATMOSPHERE
    };
    Some(Medium::Gas {
        gas: gas.clone(),
        pressure,
    })
}

fn temperatures(
    record: &Record,
    (heat, back): (Option<f64>, Option<&Back>),
    collector: &mut Collector,
) -> Option<(Vec<Case>, f64)> {
    let absent = Record::absent(&record.at("temperature"), &record.place);
    let table = match record.record("temperature") {
        Some(table) => table,
        None if record.has("temperature") => return None,
        None => &absent,
    };
    let assembly = match table.number("assembly") {
        Some(assembly) => assembly,
        None if table.has("assembly") => return None,
        None => {
            collector.assume(table.at("assembly"), "20 °C", "not stated");
            ROOM
        }
    };
    let radiating = back.and_then(|back| back.radiating.as_ref());
    if let Some(case) = radiating.and_then(|back| back.surface((record, table), heat, collector)) {
        return Some((vec![case?], assembly));
    }
    for key in ["hot", "cold"] {
        if table.has("sink") && table.has(key) {
            collector.report(two_ways(table, ["sink", key]));
            return None;
        }
    }
    let mut cases = Vec::new();
    for (key, name) in [("sink", "service"), ("hot", "hot"), ("cold", "cold")] {
        if table.has(key) {
            cases.push(Case {
                name,
                temperature: table.number(key)?,
            });
        }
    }
    if let Some((temperature, place)) = back.and_then(|back| back.temperature.as_ref()) {
        let temperature = *temperature;
        let agrees = cases
            .iter()
            .all(|case| (case.temperature - temperature).abs() < 1e-6);
        collector.require(agrees, || {
            fault(
                "file/conflict",
                place,
                "the sink has two temperatures: this one and `service.temperature`",
            )
            .expecting("expected one of the two")
        });
        if cases.is_empty() {
            cases.push(Case {
                name: "service",
                temperature,
            });
        }
    }
    if cases.is_empty() {
        collector.assume(table.at("sink"), "20 °C", "not stated");
        cases.push(Case {
            name: "service",
            temperature: ROOM,
        });
    }
    if let [hot, cold] = cases.as_slice() {
        collector.require(cold.temperature <= hot.temperature, || {
            fault(
                "value/min-above-max",
                &table.span("cold"),
                "the cold case is warmer than the hot case",
            )
            .expecting("expected below `hot`")
        });
    }
    if let Some(radiating) = radiating {
        radiating.tell_surroundings(&cases, heat, collector);
    }
    Some((cases, assembly))
}

/// The requirement: the outer option is none when it is faulty.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
fn require(
    file: &Record,
    record: &Record,
    collector: &mut Collector,
) -> Option<Option<Requirement>> {
    let states_heat = heating::states_heat(file);
    if !record.has("require") {
        return Some(None);
    }
    let table = record.record("require")?;
    let stated: Vec<&str> = ["rise", "resistance", "conductance"]
        .into_iter()
        .filter(|key| table.has(key))
        .collect();
    let key = match stated.as_slice() {
        [key] => *key,
        [] => {
            collector.report(missing(table, "rise", "rise = \"5 K\""));
            return None;
        }
        [first, second, ..] => {
            collector.report(two_ways(table, [first, second]));
            return None;
        }
    };
    if key == "rise" && !states_heat {
        collector.report(missing(record, "heat", "heat = \"22 W\"").help(
            "a limit of the rise needs the heat: `heat = \"22 W\"`; without heat require a resistance",
        ));
    }
    let of = match (table.text("of"), key) {
        (Some(of), _) => of,
        (None, _) if table.has("of") => return None,
        (None, "rise") => "mean",
        (None, _) => "source to sink",
    };
    let words: &[&str] = if key == "rise" { &RISES } else { &PLANES };
    if !words.contains(&of) {
        collector.report(
            fault(
                "file/conflict",
                &table.span("of"),
                format!("`{key}` has no `{of}`"),
            )
            .expecting(format!("expected {}", crate::joint::fields::listed(words))),
        );
        return None;
    }
    let plane = match of {
        "contact" => Plane::Contact,
        "node to node" => Plane::NodeToNode,
        "added by joint" => Plane::AddedByJoint,
        _ => Plane::SourceToSink,
    };
    let from_coolant = table.text("above") == Some("coolant");
    if from_coolant && !counts_from_coolant(table, (key, of), file, collector) {
        return None;
    }
    let kind = match (key, of) {
        ("rise", "hottest") if from_coolant => RequirementKind::HottestAboveCoolant,
        ("rise", "mean") if from_coolant => RequirementKind::AboveCoolant,
        ("rise", "hottest") => RequirementKind::HottestRise,
        ("rise", "interface") => RequirementKind::InterfaceDrop,
        ("rise", _) => RequirementKind::Rise,
        ("resistance", _) => RequirementKind::Resistance(plane),
        _ => RequirementKind::Conductance(plane),
    };
    let bound = match (table.text("bound"), key) {
        (Some("least"), _) | (None, "conductance") => Limit::Least,
        _ => Limit::Most,
    };
    Some(Some(Requirement {
        kind,
        limit: table.number(key)?,
        bound,
    }))
}

/// Whether a limit can count from the coolant: a rise above films, through which all heat leaves.
fn counts_from_coolant(
    table: &Record,
    (key, of): (&str, &str),
    file: &Record,
    collector: &mut Collector,
) -> bool {
    let rise = key == "rise" && of != "interface";
    collector.require(rise, || {
        fault(
            "file/conflict",
            &table.span("above"),
            "only a rise of the mean or the hottest counts from the coolant",
        )
        .expecting("expected without `above`")
        .help("for example `require = { rise = \"35 K\", of = \"hottest\", above = \"coolant\" }`")
    });
    let last = file.records("plate").last();
    let cooled = last.map_or(&[][..], |plate| plate.records("cooled"));
    let films = !cooled.is_empty() && cooled.iter().all(|part| part.has("film"));
    collector.require(films, || {
        fault(
            "file/conflict",
            &table.span("above"),
            "the limit counts from the coolant, and heat does not leave through films alone",
        )
        .expecting("expected `film` in every `cooled` of the last plate, or a limit above the sink surface")
        .help("state the film: `cooled = { film = \"500 W/(m²·K)\" }`, or leave `above` out")
    });
    rise && films
}
