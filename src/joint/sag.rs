//! Thermal sag of a plate: by heat flux, by curvature, or by a second layer.

use crate::joint::{
    Bimetal, Sag,
    collector::{Collector, Wording},
    heating,
    materials::{self, Own},
    plates::two_ways,
    record::Record,
    walk::missing,
};

/// Reads the sag of a plate; none when it states none or a faulty one.
pub(super) fn read(
    file: &Record,
    plate: &Record,
    own: &Own,
    collector: &mut Collector,
) -> Option<Sag> {
    let record = plate.record("sag")?;
    let stated: Vec<&str> = ["flux", "curvature", "bimetal"]
        .into_iter()
        .filter(|key| record.has(key))
        .collect();
    match stated.as_slice() {
        ["flux"] => flux(file, record, collector),
        ["curvature"] => record.number("curvature").map(Sag::Curvature),
        ["bimetal"] => bimetal(record.record("bimetal")?, own, collector),
        [first, second, ..] => {
            collector.report(two_ways(record, [first, second]));
            None
        }
        _ => {
            collector.report(missing(record, "flux", "flux = \"20 kW/m²\""));
            None
        }
    }
}

fn flux(file: &Record, record: &Record, collector: &mut Collector) -> Option<Sag> {
    if let Some(flux) = record.number("flux") {
        return Some(Sag::Flux(flux));
    }
    record.text("flux")?;
    let service = file.record("service");
    if let Some(service) = service.filter(|_| !heating::states_heat(file)) {
        collector.report(missing(service, "heat", "heat = \"22 W\"").help(
            "sag by `flux = \"heat\"` needs the heat: `heat = \"22 W\"`; or state the flux itself: `flux = \"20 kW/m²\"`",
        ));
        return None;
    }
    collector.assume(
        record.at("flux"),
        "the stated heat over the area of the outline",
        "as asked by \"heat\"; the same all over, cut-outs not taken off",
    );
    Some(Sag::Heat)
}

fn bimetal(record: &Record, own: &Own, collector: &mut Collector) -> Option<Sag> {
    let material = materials::of_plate(record, own, collector);
    Some(Sag::Bimetal(Box::new(Bimetal {
        thickness: record.number("thickness")?,
        change: record.number("change")?,
        material: material?,
    })))
}
