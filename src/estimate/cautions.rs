//! Every caution of an estimate, gathered along the chain and put in order of gravity.

mod brittle;
mod elastic;
mod faces;
mod feet;
mod field;

pub(super) use field::{FLATNESS_DECIDES, GAP_IGNORED};

use field::GAS_MATTERS;

use crate::{
    catalog,
    diagnostic::{Caution, registry},
    estimate::{
        CaseResult, Chain, Failure, Realisation, State, chain::LARGE_ERROR, forces, group_label,
    },
    joint::{FillerKind, Finish, Joint, Medium, Plate, Sink},
    preload,
};

/// A plain service temperature this far from assembly moves the clamp force noticeably, K.
const NOTICEABLE: f64 = 40.0;
/// Metal this hot burns skin on short contact, K (60 °C; ISO 13732-1 gives thresholds by time and
/// material; this value from memory).
const BURNS: f64 = 333.15;
/// Source to sink this many times the contact-only value is limited by spreading.
const SPREADING: f64 = 5.0;
/// Share of source to sink that narrow zones may leave out before it is worth a word.
const NARROW: f64 = 0.02;
/// Shanks that carry more than this share of the contact conductance are worth a word.
const BYPASS: f64 = 0.02;

/// Every caution of the chain, each once, the gravest first; equal gravity keeps the order of the
/// chain.
pub fn gathered(chain: &Chain, cases: &[CaseResult]) -> Result<Vec<Caution>, Failure> {
    let joint = chain.joint();
    let state = chain.state(0, &Realisation::default())?;
    let mut found = Vec::new();
    found.extend(preload_cautions(chain));
    found.extend(field::field_cautions(chain, cases));
    found.extend(faces::conductance_cautions(joint, &state, cases));
    found.extend(faces::material_cautions(joint, cases));
    found.extend(faces::gas_out_of_table(joint, cases));
    found.extend(resistance_cautions(chain, &state, cases)?);
    found.extend(service_cautions(chain, cases)?);
    let mut told: Vec<Caution> = Vec::new();
    for caution in found {
        if !told.contains(&caution) {
            told.push(caution);
        }
    }
    registry::sort_by_gravity(&mut told);
    Ok(told)
}

const DEFER: &str = "an estimate for design: local codes, the applicable standard and a responsible, \
                     qualified engineer decide; prove a joint that matters by test";

fn caution(code: &'static str, text: impl Into<String>) -> Caution {
    Caution {
        code,
        text: text.into(),
    }
}

fn preload_cautions(chain: &Chain) -> Vec<Caution> {
    let joint = chain.joint();
    let mut found = Vec::new();
    for (fastener, prepared) in chain.groups() {
        let name = group_label(fastener);
        let group = preload::Group {
            name: &name,
            fastener,
            supports: &prepared.supports,
        };
        found.extend(preload::group_cautions(&group));
        let largest = prepared.largest_torque(joint, fastener);
        found.extend(preload::window_cautions(&group, largest));
        for (case, named) in joint.service.cases.iter().enumerate() {
            let force = preload::force_band(fastener).low;
            let left = prepared.balance(joint, (case, &Realisation::losing(1.0)), force);
            let label = format!("{name}, {} case, lowest force", named.name);
            found.extend(preload::opened(&label, left));
            found.extend(preload::hardly_clamped(&label, [force, left]));
            let clamp = prepared.clamp(joint, fastener, case);
            found.extend(preload::springs_flat(
                &label_of(&name, named.name),
                (fastener, clamp),
            ));
            let shared = prepared.shared(joint, fastener, case);
            found.extend(shared.and_then(|shared| {
                preload::parts(&label_of(&name, named.name), (fastener, &shared))
            }));
        }
        let in_service = prepared.in_service(joint, fastener);
        found.extend(preload::over_in_service(&name, &in_service));
        found.extend(brittle::plates(joint, &name, fastener));
    }
    if forces::on_soft_layer(joint) && joint.bolts().count() > 1 {
        let loss = joint.losses.and_then(|losses| losses.interaction);
        let loss = loss.unwrap_or(forces::INTERACTION[1]);
        found.push(caution(
            "preload/soft-layer",
            format!(
                "a layer that yields lies between the plates: a bolt loses force while the others are tightened ({:.0} \
                 % taken) and afterwards as the layer creeps; tighten crosswise in several passes, and once more later",
                100.0 * loss
            ),
        ));
    }
    for case in &joint.service.cases {
        let apart = (case.temperature - joint.service.assembly_temperature).abs();
        if case.name == "service" && apart > NOTICEABLE {
            found.push(caution(
                "preload/temperature-not-acting",
                format!(
                    "service is {apart:.0} K away from assembly, and a plain temperature does not move the clamp \
                     force; state hot and cold cases to let expansion act"
                ),
            ));
        }
    }
    found
}

fn label_of(name: &str, case: &str) -> String {
    format!("{name}, {case} case")
}

/// A word on a numerical error that is larger than it should be.
fn error_caution(chain: &Chain, error: f64) -> Option<Caution> {
    (error > LARGE_ERROR).then(|| {
        let percent = 100.0 * error;
        let text = if chain.cells().is_some() {
            format!(
                "the plan grid is coarse for these bolts or for so small a heated zone: source to sink may be \
                 {percent:.0} % off"
            )
        } else {
            format!(
                "the {} grid is coarse for this joint: on the next coarser one source to sink differs by {percent:.0} %; \
                 a finer --resolution tells more",
                chain.resolution_name()
            )
        };
        caution("resistance/grid-error", text)
    })
}

/// What the plan grid of the closed-form field leaves out.
fn plan_grid_cautions(joint: &Joint, cases: &[CaseResult]) -> Vec<Caution> {
    let mut found = Vec::new();
    if cases
        .first()
        .is_some_and(|case| case.resistance_upper.is_none())
    {
        found.push(caution(
            "resistance/cell",
            "the plates are taken as sheets on a plan grid and the pressure from each bolt's own cone: on two joints \
             solved in full this read 6 and 10 % high in vacuum; no upper bound is proved",
        ));
    }
    if joint.sink.alone() == Some(Sink::Rim) && joint.bolts().count() > 1 {
        found.push(caution(
            "resistance/edge-sink",
            format!(
                "heat leaves {} at its rim: the plate's own length is part of the path and the bolts near the rim carry \
                 most; a plate taken as a sheet erred by 4 to 5 % there",
                joint.cold().name
            ),
        ));
    }
    found
}

fn resistance_cautions(
    chain: &Chain,
    state: &State,
    cases: &[CaseResult],
) -> Result<Vec<Caution>, Failure> {
    let mut found = Vec::new();
    let left_out = chain.left_out()?;
    if let Some(case) = cases.first() {
        let whole = case.results.source_to_sink.resistance.nominal;
        found.extend(error_caution(
            chain,
            case.numerical_error - left_out / whole,
        ));
        if left_out > NARROW * whole {
            found.push(caution(
                "resistance/narrow-zone",
                format!(
                    "a heated or cooled zone is narrow against the thickness of its plate: source to sink may read up to \
                     {left_out:.3} K/W low ({:.0} %), on any grid; what the joint adds is less touched",
                    100.0 * left_out / whole
                ),
            ));
        }
    }
    if chain.cells().is_some() {
        found.extend(plan_grid_cautions(chain.joint(), cases));
    }
    if let Some(case) = cases.first() {
        let contact = case.results.contact.resistance.nominal;
        let whole = case.results.added_by_joint.resistance.nominal;
        if whole > SPREADING * contact {
            found.push(caution(
                "service/spreading-limited",
                format!(
                    "the joint adds {:.0} times its contact-only resistance: heat squeezes through the plates to the \
                     bolts; more plate thickness or more bolts help, torque and finish hardly",
                    whole / contact
                ),
            ));
        }
        let shank: f64 = state.conditions.shanks.iter().sum();
        if shank * contact > BYPASS {
            found.push(caution(
                "resistance/bypass",
                format!(
                    "the bolt shanks carry {:.2} W/K beside the faces ({:.0} % of the contact conductance)",
                    shank,
                    100.0 * shank * contact
                ),
            ));
        }
    }
    Ok(found)
}

fn service_cautions(chain: &Chain, cases: &[CaseResult]) -> Result<Vec<Caution>, Failure> {
    let joint = chain.joint();
    let mut found = Vec::new();
    let gas_matters = (0..joint.interfaces())
        .any(|interface| joint.is_bare(interface) && joint.filler(interface).is_none());
    match &joint.service.medium {
        Medium::Gas { gas, .. } if gas_matters && chain.gas_share()? > GAS_MATTERS => {
            found.extend(flatters(chain, &gas.name, cases)?);
        }
        Medium::Vacuum => found.extend(vacuum_materials(joint)),
        Medium::Gas { .. } => {}
    }
    if insulates(joint) {
        found.push(caution(
            "service/isolation-and-bonding",
            "a layer in this joint insulates or may insulate: neither electrical isolation nor bonding is proved here; \
             bolts bridge it, burrs pierce it",
        ));
    }
    for case in cases {
        let Some(rise) = &case.rise else { continue };
        let hottest = case.sink_temperature + rise.hottest.nominal;
        if hottest > BURNS {
            found.push(caution(
                "service/hot-surface",
                format!(
                    "{} case: a surface reaches {:.0} °C and burns skin; guard or mark it as local rules ask",
                    case.name,
                    hottest - 273.15
                ),
            ));
        }
    }
    found.push(caution("service/defer", DEFER));
    Ok(found)
}

/// How much better the joint reads in its gas than it would in vacuum.
fn flatters(chain: &Chain, gas: &str, cases: &[CaseResult]) -> Result<Option<Caution>, Failure> {
    let Some(case) = cases.first() else {
        return Ok(None);
    };
    let vacuum = chain.in_vacuum()?.state(0, &Realisation::default())?.path;
    let ratio = vacuum.added_by_joint / case.results.added_by_joint.resistance.nominal;
    Ok(Some(caution(
        "service/air-flatters-vacuum",
        format!(
            "in vacuum this joint would add {ratio:.1} times what it adds in {gas}: a test in {gas} says little about \
             vacuum"
        ),
    )))
}

fn vacuum_materials(joint: &Joint) -> Vec<Caution> {
    let mut found: Vec<String> = faying(joint)
        .filter_map(|(plate, finish)| {
            let family = &finish.coating.as_ref()?.plating.family;
            ["cadmium", "zinc", "tin"]
                .contains(&family.as_str())
                .then(|| format!("{family} on {}", plate.name))
        })
        .collect();
    let silicone = joint
        .every_filler()
        .filter_map(|filler| catalog::filler(&filler.name))
        .filter(|record| record.silicone);
    found.extend(silicone.map(|record| record.name.clone()));
    found.dedup();
    if found.is_empty() {
        return Vec::new();
    }
    vec![caution(
        "service/vacuum-materials",
        format!(
            "{} in vacuum: cadmium and zinc sublime, pure tin grows whiskers, silicone creeps and contaminates",
            found.join(", ")
        ),
    )]
}

/// Every faying face with its plate, from warm to cold.
fn faying(joint: &Joint) -> impl Iterator<Item = (&Plate, &Finish)> {
    (0..joint.interfaces()).flat_map(|interface| {
        let plates = joint.meeting(interface);
        plates.into_iter().zip(joint.finishes(interface))
    })
}

fn insulates(joint: &Joint) -> bool {
    let film = faying(joint).any(|(_, finish)| {
        finish
            .coating
            .as_ref()
            .is_some_and(|coating| !coating.plating.metal)
    });
    let filler = joint.every_filler().any(|filler| {
        catalog::filler(&filler.name)
            .map_or(matches!(filler.kind, FillerKind::Layer { .. }), |record| {
                record.insulates
            })
    });
    film || filler
}
