//! Axial load, disc springs and the hold of an insert.

use crate::{
    joint::{
        AxialLoad, Bounds, DiscSprings, InsertHold, Joint,
        collector::{Collector, Wording, fault},
        record::Record,
        walk::missing,
    },
    units::{self, Quantity},
};

/// Load introduction factor where none is stated: unknown, so each end takes its own worst.
const INTRODUCTION: Bounds = Bounds::uniform([0.0, 0.5, 1.0]);
/// Factor on the load at which the faces may part; NASA-STD-5020 asks 1.2 of joints that must not
/// (from memory).
const SAFETY: f64 = 1.2;
/// Young's modulus and Poisson's ratio of spring steel in DIN EN 16984 (as printed in tables of DIN 2093).
const SPRING_STEEL: (f64, f64) = (206e9, 0.3);
/// Cone height over thickness beyond which the force of a disc falls again before it is flat.
const MOST_CONE: f64 = std::f64::consts::SQRT_2;

/// Reads the axial load of a fastener: the outer option is none when it is faulty.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
pub(super) fn axial(fastener: &Record, collector: &mut Collector) -> Option<Option<AxialLoad>> {
    if !fastener.has("axial_load") {
        return Some(None);
    }
    let record = fastener.record("axial_load")?;
    if !["value", "hot", "cold"].iter().any(|key| record.has(key)) {
        collector.report(missing(record, "value", "axial_load = \"500 N\""));
        return None;
    }
    // A key that stands there faulty has been told of.
    let load = |key: &str| match record.spread(key) {
        None if record.has(key) => None,
        spread => Some(spread.map(|spread| spread.bounds)),
    };
    let introduction = match record.spread("introduction") {
        Some(spread) => spread.bounds,
        None if record.has("introduction") => return None,
        None => {
            collector.assume(
                record.at("introduction"),
                "0.5, from 0 to 1",
                "not stated; the bolt's force takes 1 and the clamp that is left takes 0, each its worst end",
            );
            INTRODUCTION
        }
    };
    let safety = match record.number("safety") {
        Some(safety) => safety,
        None if record.has("safety") => return None,
        None => {
            collector.assume(
                record.at("safety"),
                format!("{SAFETY}"),
                "not stated; asked of joints that must not part (NASA-STD-5020, from memory)",
            );
            SAFETY
        }
    };
    let lasting = match record.flag("lasting") {
        Some(lasting) => lasting,
        None if record.has("lasting") => return None,
        None => {
            collector.assume(
                record.at("lasting"),
                "true",
                "not stated; the load relieves the faces while the heat is judged",
            );
            true
        }
    };
    Some(Some(AxialLoad {
        any: load("value")?,
        hot: load("hot")?,
        cold: load("cold")?,
        introduction,
        safety,
        lasting,
    }))
}

/// Refuses a load in a case that the service does not state.
pub(super) fn check(joint: &Joint, file: &Record, collector: &mut Collector) {
    for record in file.records("fastener") {
        let Some(load) = record.record("axial_load") else {
            continue;
        };
        for case in ["hot", "cold"] {
            let known = joint.service.cases.iter().any(|each| each.name == case);
            collector.require(known || !load.has(case), || {
                fault(
                    "file/conflict",
                    &load.span(case),
                    format!("a load for the {case} case, which the service does not state"),
                )
                .expecting("expected `value` for every case")
                .help(format!(
                    "state the case: `temperature = {{ {case} = \"50 °C\" }}` in [service]"
                ))
            });
        }
    }
}

/// Reads the disc springs of a fastener: the outer option is none when they are faulty.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
pub(super) fn springs(fastener: &Record, collector: &mut Collector) -> Option<Option<DiscSprings>> {
    if !fastener.has("disc_springs") {
        return Some(None);
    }
    let record = fastener.record("disc_springs")?;
    let (outer, inner) = (record.number("outer"), record.number("inner"));
    let (thickness, cone) = (record.number("thickness"), record.number("cone_height"));
    let mut sound = true;
    if let (Some(outer), Some(inner)) = (outer, inner)
        && inner >= outer
    {
        sound = false;
        collector.report(
            fault(
                "value/min-above-max",
                &record.span("inner"),
                "the hole of the disc spring is not smaller than the disc",
            )
            .expecting(format!(
                "expected below {}",
                units::show(outer, Quantity::Length)
            )),
        );
    }
    if let (Some(thickness), Some(cone)) = (thickness, cone)
        && cone > MOST_CONE * thickness
    {
        sound = false;
        collector.report(
            fault(
                "value/range",
                &record.span("cone_height"),
                "a disc with so high a cone snaps through: its force falls again before it is flat",
            )
            .expecting(format!(
                "at most {}",
                units::show(MOST_CONE * thickness, Quantity::Length)
            ))
            .help("`cone_height` is the free height less the thickness: 0.4 (series A) to 1.3 (series C) times the thickness"),
        );
    }
    let count = |key: &str, collector: &mut Collector| match record.counts(key) {
        Some([count]) => u32::try_from(*count).ok(),
        Some(_) => {
            collector.report(
                fault("value/range", &record.span(key), "two numbers of discs")
                    .expecting("expected one whole number"),
            );
            None
        }
        None => (!record.has(key)).then_some(1),
    };
    let (parallel, series) = (count("parallel", collector), count("series", collector));
    let youngs_modulus = match record.number("modulus") {
        Some(modulus) => modulus,
        None if record.has("modulus") => return None,
        None => {
            collector.assume(record.at("modulus"), "206 GPa", "not stated; spring steel");
            SPRING_STEEL.0
        }
    };
    let springs = DiscSprings {
        outer_diameter: outer?,
        inner_diameter: inner?,
        thickness: thickness?,
        cone_height: cone?,
        youngs_modulus,
        poisson: SPRING_STEEL.1,
        parallel: parallel?,
        series: series?,
    };
    sound.then_some(Some(springs))
}

/// Reads how an insert is held; none when it is faulty.
pub(super) fn insert(fastener: &Record, collector: &mut Collector) -> Option<InsertHold> {
    let Some(table) = fastener.record("engagement") else {
        return (!fastener.is_faulty("engagement")).then(InsertHold::default);
    };
    for key in ["pull_out", "outer"] {
        let idle = table.has(key) && table.text("kind").is_some_and(|kind| kind != "insert");
        collector.require(!idle, || {
            fault(
                "file/conflict",
                &table.span(key),
                format!("`{key}` belongs to an insert"),
            )
            .expecting("expected `kind = \"insert\"`")
        });
    }
    let number = |key: &str| match table.number(key) {
        None if table.has(key) => None,
        number => Some(number),
    };
    Some(InsertHold {
        pull_out: number("pull_out")?,
        outer_diameter: number("outer")?,
    })
}
