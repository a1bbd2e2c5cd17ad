//! What heat and cold forbid: data beyond their temperatures, and the laws of contact below 30 K.

use crate::{
    catalog::{ColdFault, Material},
    joint::{
        Case, Fastener, Joint,
        collector::{Collector, Wording, fault},
        record::Record,
        tree::Span,
    },
    units::{self, Quantity},
};

/// Below this bare metal contacts follow none of the laws, K: 0.01 to 0.26 W/K were measured
/// where they say 24 to 49.
const LAWS_END: f64 = 30.0;

/// Checks every case against what is known of the materials, and whether the faces have all they
/// need.
pub(super) fn check(joint: &Joint, file: &Record, collector: &mut Collector) {
    let plates = file.records("plate");
    for (plate, record) in joint.plates.iter().zip(plates) {
        let span = record.span("material");
        cold_data(&plate.material, joint, &span, collector);
    }
    for (fastener, record) in joint.fasteners.iter().zip(file.records("fastener")) {
        let cold = joint
            .service
            .cases
            .iter()
            .find_map(|case| bolt(fastener, joint, case).err());
        if let Some(washers) = &fastener.isolating {
            let span = record.span("isolating");
            cold_data(&washers.material, joint, &span, collector);
        }
        if let Some(cold) = cold {
            let advice = "choose a grade whose metal is known in the cold, such as `A2-70`";
            collector.report(data_fault(&cold, &record.span("grade"), advice));
        }
    }
    for (index, (plate, record)) in joint.plates.iter().zip(plates).enumerate() {
        let mut beside = [index.wrapping_sub(1), index].into_iter();
        if !beside.any(|interface| interface < joint.interfaces() && joint.is_bare(interface)) {
            continue;
        }
        let material = &plate.material;
        let known = material.hardness.is_some() || material.microhardness.is_some();
        collector.require(known, || {
            fault(
                "material/missing-property",
                &record.span("material"),
                format!(
                    "`{}` has no hardness, which bare contact needs",
                    material.name
                ),
            )
            .expecting("expected a material with hardness")
            .help("state it: `material = { like = \"…\", hardness = \"1200 MPa\" }`")
        });
    }
    if (0..joint.interfaces()).any(|interface| joint.is_bare(interface)) {
        for case in &joint.service.cases {
            collector.require(case.temperature >= LAWS_END, || cold_contact(file, case));
        }
    }
}

fn cold_data(material: &Material, joint: &Joint, span: &Span, collector: &mut Collector) {
    for case in &joint.service.cases {
        let unknown = material
            .conductivity_at(case.temperature)
            .err()
            .or_else(|| contraction(material, joint, case).err());
        if let Some(cold) = unknown {
            let advice = "state your own in a [[material]] table: `conductivity`, `expansion` and \
                          `valid_from = \"77 K\"`";
            collector.report(data_fault(&cold, span, advice));
            return;
        }
    }
}

/// Above this neither materials nor gases are known, K.
const DATA_END: f64 = 600.0;

/// Whether temperature leaves the force alone: a plain service temperature moves nothing, so that
/// contraction need not be known.
fn stays(case: &Case) -> bool {
    case.name == "service" && case.temperature <= DATA_END
}

fn contraction(material: &Material, joint: &Joint, case: &Case) -> Result<f64, ColdFault> {
    if stays(case) {
        return Ok(0.0);
    }
    material.contraction_between(joint.service.assembly_temperature, case.temperature)
}

fn bolt(fastener: &Fastener, joint: &Joint, case: &Case) -> Result<f64, ColdFault> {
    let grade = &fastener.grade;
    if fastener.shank_path {
        grade.conductivity_at(case.temperature)?;
    }
    if stays(case) {
        return Ok(0.0);
    }
    grade.contraction_between(joint.service.assembly_temperature, case.temperature)
}

/// Data that do not reach the temperature; `advice` mends the cold, nothing the heat.
fn data_fault(missing: &ColdFault, span: &Span, advice: &str) -> crate::diagnostic::Fault {
    if missing.is_hot() {
        return fault("material/above-range", span, missing.to_string())
            .expecting("no data at this temperature")
            .help(
                "lower the temperature: beyond this neither the catalogue nor a [[material]] of \
                 the file is carried on",
            );
    }
    fault("material/cold-data", span, missing.to_string())
        .expecting("no data at this temperature")
        .help(advice)
}

fn cold_contact(file: &Record, case: &Case) -> crate::diagnostic::Fault {
    let service = file.record("service");
    let span = service.map_or(0..0, |service| match service.record("temperature") {
        Some(table) if table.has(case.name) => table.span(case.name),
        _ => service.span("temperature"),
    });
    fault(
        "service/cold-contact",
        &span,
        format!(
            "bare metal contacts at {} follow no known law",
            units::show(case.temperature, Quantity::Temperature)
        ),
    )
    .expecting("expected 30 K or more for bare contact")
    .help(
        "measure it and state the force law: `[measured] law = { conductance = \"0.1 W/K\", force = \"1 kN\" }`",
    )
}
