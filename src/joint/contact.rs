//! How the faces touch, and losses of clamp force.

use crate::{
    catalog::MaterialKind,
    joint::{
        Bounds, Compliance, ConeRule, ConeShape, Contact, FaceFriction, Finish, HeadModel, Law,
        Losses, Retightened,
        collector::{Collector, Wording, fault},
        plates::{PlateDraft, two_ways},
        record::{PerPlate, Record},
        seats::unknown_plate,
        walk::missing,
    },
};

/// Hemispherical emissivity of bare machined metal, and of oxide films and non-metals (judgement).
const EMISSIVITY: [f64; 2] = [0.1, 0.8];

/// Scatter of the solid-spot laws about measured joints of known surfaces, one standard deviation.
///
/// 12.6 % is the published figure for 61 coated points; 10–20 % for bare bead-blasted faces is
/// from memory; 15 % lies between.
const LAW_SCATTER: f64 = 0.15;

/// Short-term relaxation of all-metal joints in NASA practice (memory).
const RELAXATION: f64 = 0.05;

/// Most relaxation that a file may state, as of one field.
const MOST_RELAXATION: f64 = 0.9;

/// Reads `[contact]` with the emissivity of all faces.
pub(super) fn read(
    file: &Record,
    plates: &[PlateDraft],
    collector: &mut Collector,
) -> Option<Contact> {
    let absent = Record::absent("contact", &(0..0));
    let record = match file.record("contact") {
        Some(record) => record,
        None if file.has("contact") => return None,
        None => &absent,
    };
    let law = match record.text("law") {
        None if record.has("law") => None,
        Some("plastic") => Some(Law::Plastic),
        Some("elastic") => Some(Law::Elastic),
        Some("plastic-power") => Some(Law::PlasticPower),
        _ => Some(Law::ElasticPlastic),
    };
    let cone = match (record.text("cone"), record.number("cone")) {
        (None, None) if record.has("cone") => None,
        (_, Some(angle)) => Some(ConeRule::HalfAngle(angle)),
        (Some("vdi"), _) => Some(ConeRule::Vdi),
        _ => Some(ConeRule::Fitted),
    };
    let shape = shape(record, cone, collector);
    let head_model = word(record, "head_model", [HeadModel::Uniform, HeadModel::Rigid]);
    let faces = word(
        record,
        "faces",
        [FaceFriction::Frictionless, FaceFriction::Stuck],
    );
    let compliance = word(
        record,
        "compliance",
        [Compliance::Hard, Compliance::Asperities],
    );
    let scatter = match record.number("scatter") {
        None if record.has("scatter") => None,
        None => {
            // Where own measurements stand no law is asked.
            if !file.has("measured") {
                collector.assume(
                    record.at("scatter"),
                    format!("{:.0} %", 100.0 * LAW_SCATTER),
                    "not stated; the laws scatter by 12.6 % about 61 published points (seen) and \
                     10 to 20 % about bare bead-blasted faces (from memory)",
                );
            }
            Some(LAW_SCATTER)
        }
        scatter => scatter,
    };
    let emissivity = emissivity(record, plates, collector);
    Some(Contact {
        law: law?,
        law_factor: 1.0 + scatter?,
        cone: cone?,
        shape: shape?,
        emissivity: emissivity?,
        head_model: head_model?,
        faces: faces?,
        compliance: compliance?,
    })
}

/// Default or second choice of a field with two words; none when it is faulty.
fn word<T>(record: &Record, key: &str, [default, second]: [T; 2]) -> Option<T> {
    match record.text(key) {
        None if record.has(key) => None,
        Some("rigid" | "stuck" | "asperities") => Some(second),
        _ => Some(default),
    }
}

fn shape(record: &Record, cone: Option<ConeRule>, collector: &mut Collector) -> Option<ConeShape> {
    let fitted = cone? == ConeRule::Fitted;
    match record.text("shape") {
        None if record.has("shape") => None,
        Some("fitted") if !fitted => {
            collector.report(
                fault(
                    "file/conflict",
                    &record.span("shape"),
                    "the fitted shape belongs to the fitted cone",
                )
                .expecting("expected `uniform`, `linear` or `polynomial`"),
            );
            None
        }
        Some("uniform") => Some(ConeShape::Uniform),
        Some("linear") => Some(ConeShape::Linear),
        Some("polynomial") => Some(ConeShape::Polynomial),
        None if !fitted => Some(ConeShape::Linear),
        _ => Some(ConeShape::Fitted),
    }
}

/// Emissivity of the warm and the cold face of every interface.
fn emissivity(
    record: &Record,
    plates: &[PlateDraft],
    collector: &mut Collector,
) -> Option<Vec<[f64; 2]>> {
    if record.has("emissivity") && record.per_plate("emissivity").is_none() {
        return None;
    }
    let mut stated = vec![None; plates.len()];
    match record.per_plate("emissivity") {
        None => {}
        Some(PerPlate::Both(both)) => stated.fill(Some(*both)),
        Some(PerPlate::Each(each)) => {
            one_for_each(record, ("emissivity", each), plates, collector)?;
            stated = each.iter().copied().map(Some).collect();
        }
        Some(PerPlate::Named { others, named }) => {
            stated.fill(*others);
            for (name, span, value) in named {
                match plates.iter().position(|plate| plate.name == *name) {
                    Some(place) => stated[place] = Some(*value),
                    None => collector.report(unknown_plate(name, span, plates)),
                }
            }
        }
    }
    let mut faces = Vec::with_capacity(plates.len());
    for (plate, common) in plates.iter().zip(stated) {
        let own = plate.record.number("emissivity");
        if plate.record.has("emissivity") && own.is_none() {
            return None;
        }
        faces.push(match own.or(common) {
            Some(emissivity) => [emissivity; 2],
            None => assumed_emissivities(plate, collector)?,
        });
    }
    let pairs = faces.windows(2).map(|pair| [pair[0][1], pair[1][0]]);
    Some(pairs.collect())
}

/// A list of values is one for each plate.
pub(super) fn one_for_each(
    record: &Record,
    (key, values): (&str, &[f64]),
    plates: &[PlateDraft],
    collector: &mut Collector,
) -> Option<()> {
    let whole = values.len() == plates.len();
    collector.require(whole, || {
        fault(
            "file/wrong-type",
            &record.span(key),
            format!(
                "`{key}` has {} values for {} plates",
                values.len(),
                plates.len()
            ),
        )
        .expecting("expected one value for each plate")
        .help("or name the plates: `{ base = …, panel = … }`")
    });
    whole.then_some(())
}

/// Emissivity of the faces towards the warm and the cold side of a plate that states none.
fn assumed_emissivities(plate: &PlateDraft, collector: &mut Collector) -> Option<[f64; 2]> {
    let (above, why) = assumed_emissivity(plate, plate.finish.as_ref()?)?;
    collector.assume(plate.record.at("emissivity"), above.to_string(), why);
    let Some(below) = &plate.finish_below else {
        return Some([above; 2]);
    };
    let (below, why) = assumed_emissivity(plate, below)?;
    let path = plate.record.at("finish_below.emissivity");
    collector.assume(path, below.to_string(), why);
    Some([above, below])
}

fn assumed_emissivity(plate: &PlateDraft, finish: &Finish) -> Option<(f64, &'static str)> {
    let film = finish
        .coating
        .as_ref()
        .is_some_and(|coating| !coating.plating.metal);
    let metal = plate.material.as_ref()?.kind == MaterialKind::Metal;
    Some(if metal && !film {
        (EMISSIVITY[0], "bare metal")
    } else {
        (EMISSIVITY[1], "an oxide film or a non-metal")
    })
}

/// Reads `[losses]`: the outer option is none when it is faulty.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
pub(super) fn losses(file: &Record, collector: &mut Collector) -> Option<Option<Losses>> {
    if !file.has("losses") {
        collector.assume(
            "losses",
            "none at nominal; guide settling, 5 % relaxation and 5 % for bolts tightened one after another \
             (10 % on a soft layer) in the low force",
            "not stated; tighten crosswise in several passes and once more after settling",
        );
        return Some(None);
    }
    let record = file.record("losses")?;
    let retightened = match record.flag("retightened") {
        None if record.has("retightened") => return None,
        Some(true) => Retightened::Yes,
        _ => Retightened::No,
    };
    let long_term = long_term(record, collector)?;
    if retightened == Retightened::Yes {
        for key in ["settling", "relaxation", "interaction"] {
            if record.has(key) {
                collector.report(two_ways(record, ["retightened", key]).help(
                    "re-tightened bolts have settling and short-term relaxation behind them; \
                     what follows is `long_term` or `per_decade`",
                ));
                return None;
            }
        }
        return Some(Some(Losses {
            settling: None,
            relaxation: Bounds::exact(0.0),
            interaction: None,
            retightened,
            long_term,
        }));
    }
    let relaxation = match record.spread("relaxation") {
        None if record.has("relaxation") => return None,
        None => {
            collector.assume(
                record.at("relaxation"),
                format!("{:.0} %", 100.0 * RELAXATION),
                "not stated; usual for all-metal joints (from memory)",
            );
            Bounds::exact(RELAXATION)
        }
        Some(relaxation) => relaxation.bounds,
    };
    let settling = match (record.spread("settling"), record.text("settling")) {
        (Some(settling), _) => Some(settling.bounds),
        (None, None) if record.has("settling") => return None,
        _ => {
            collector.assume(
                record.at("settling"),
                "guide values",
                "VDI 2230 for thread, seats and interfaces of each bolt (from memory)",
            );
            None
        }
    };
    let interaction = match record.number("interaction") {
        None if record.has("interaction") => return None,
        None => {
            collector.assume(
                record.at("interaction"),
                "5 % where several bolts clamp, 10 % on a soft layer",
                "not stated; a judgement for bolts tightened crosswise in several passes",
            );
            None
        }
        stated => stated,
    };
    Some(Some(Losses {
        settling,
        relaxation,
        retightened,
        long_term,
        interaction,
    }))
}

/// Relaxation in service: a share, or one for every decade of time.
///
/// ```text
/// r = r_10 · log₁₀(t / 1 h)
/// ```
///
/// Common practice, no source: the loss of preload of metals goes with the logarithm of time.
fn long_term(record: &Record, collector: &mut Collector) -> Option<Bounds> {
    match (record.has("long_term"), record.has("per_decade")) {
        (true, true) => {
            collector.report(two_ways(record, ["long_term", "per_decade"]));
            None
        }
        (true, false) => record.spread("long_term").map(|spread| spread.bounds),
        (false, false) => {
            collector.require(!record.has("decades"), || {
                missing(record, "per_decade", "per_decade = \"1 %\"")
            });
            Some(Bounds::exact(0.0))
        }
        (false, true) => {
            if !record.has("decades") {
                collector.report(missing(record, "decades", "decades = 4"));
            }
            let decades = record.number("decades")?;
            let each = record.spread("per_decade")?.bounds;
            let whole = Bounds {
                low: decades * each.low,
                nominal: decades * each.nominal,
                high: decades * each.high,
                shape: each.shape,
            };
            collector.require(whole.high <= MOST_RELAXATION, || {
                fault(
                    "value/range",
                    &record.span("per_decade"),
                    format!(
                        "{decades} decades at up to {:.1} % lose {:.0} % of the clamp force",
                        100.0 * each.high,
                        100.0 * whole.high
                    ),
                )
                .expecting("expected less than 90 % in all")
            });
            (whole.high <= MOST_RELAXATION).then_some(whole)
        }
    }
}
