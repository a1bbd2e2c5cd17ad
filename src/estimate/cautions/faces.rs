//! Cautions of the faces and of the materials: laws, finishes, fillers, temperatures, pairs.

use crate::{
    catalog::{self, MaterialKind},
    diagnostic::Caution,
    estimate::{CaseResult, State, cautions::caution},
    joint::{FillerKind, Finish, Joint, Medium, Plate},
};

/// Roughness range of the slope rule, m.
const SLOPE_RULE: [f64; 2] = [0.216e-6, 9.6e-6];
/// Slope factors from here on come from the roughness rule, not from a measurement.
const BY_RULE: f64 = 1.3;
/// Gap that a film of fluid is spread to fill, m (common practice, no source).
const FILM: f64 = 50e-6;
/// Handbook conductivity serves up to here, K.
const DATA_TO: f64 = 400.0;
/// Handbook conductivity serves down to here where no fit is known, K.
const DATA_FROM: f64 = 250.0;

pub(super) fn conductance_cautions(
    joint: &Joint,
    state: &State,
    cases: &[CaseResult],
) -> Vec<Caution> {
    let mut found = Vec::new();
    for (interface, faces) in state.conditions.faces.iter().enumerate() {
        let told = cases
            .first()
            .and_then(|case| case.interfaces.get(interface));
        found.extend(faces.local.cautions(told.map_or(0.0, |told| told.peak)));
    }
    if (0..joint.interfaces()).any(|interface| joint.is_bare(interface)) {
        let by_rule: Vec<&Plate> = with_bare_face(joint, |finish| finish.slope_factor >= BY_RULE);
        if !by_rule.is_empty() {
            found.push(caution(
                "conductance/finish-not-measured",
                format!(
                    "the asperity slope of {} comes from a roughness rule; such rules differ by a factor 2 to 3, and \
                     contact conductance is proportional to it",
                    names(&by_rule)
                ),
            ));
        }
        let outside: Vec<&Plate> = with_bare_face(joint, |finish| {
            let rq = finish.roughness.nominal;
            finish.slope_factor >= BY_RULE && !(SLOPE_RULE[0]..=SLOPE_RULE[1]).contains(&rq)
        });
        if !outside.is_empty() {
            found.push(caution(
                "conductance/slope-range",
                format!(
                    "roughness of {} lies outside 0.216 to 9.6 µm Rq, where the slope rule was stated",
                    names(&outside)
                ),
            ));
        }
    }
    found.extend(fluid_in_a_wide_gap(joint, cases));
    let records = joint.every_filler();
    for record in records.filter_map(|filler| catalog::filler(&filler.name)) {
        if !record.creeps {
            continue;
        }
        found.push(caution(
            "filler/creep",
            format!(
                "{} creeps under load: tighten again after hours and after the first hot cycle, and count on less \
                 clamp force",
                record.name
            ),
        ));
    }
    found
}

/// Plates of which a face of such a finish meets another bare.
fn with_bare_face(joint: &Joint, holds: impl Fn(&Finish) -> bool) -> Vec<&Plate> {
    let plates = joint.plates.iter().enumerate();
    let told = |(index, _): &(usize, &Plate)| {
        let beside = [
            (index.checked_sub(1), 1),
            (Some(*index).filter(|at| *at < joint.interfaces()), 0),
        ];
        beside.into_iter().any(|(interface, side)| {
            interface.is_some_and(|interface| {
                joint.is_bare(interface) && holds(joint.finishes(interface)[side])
            })
        })
    };
    plates.filter(told).map(|(_, plate)| plate).collect()
}

pub(super) fn material_cautions(joint: &Joint, cases: &[CaseResult]) -> Vec<Caution> {
    let mut found = Vec::new();
    for (index, plate) in joint.plates.iter().enumerate() {
        let material = &plate.material;
        for case in cases {
            let [temperature, hottest] = temperatures(joint, (case, index));
            if temperature < DATA_FROM && material.conductivity_fit.is_none() {
                found.push(caution(
                    "material/room-temperature-data",
                    format!(
                        "{}: the conductivity of {} is a room-temperature value, used at {temperature:.0} K",
                        plate.name, material.name
                    ),
                ));
            }
            if hottest > DATA_TO {
                found.push(caution(
                    "material/above-range",
                    format!(
                        "{}: the data of {} are room-temperature values, used up to {hottest:.0} K; strength, \
                         hardness and creep change first",
                        plate.name, material.name
                    ),
                ));
            }
        }
        if material.kind == MaterialKind::Brittle {
            found.push(caution(
                "material/brittle",
                format!(
                    "{}: {} is brittle; bolt it through soft washers at low torque",
                    plate.name, material.name
                ),
            ));
        }
    }
    found.extend((0..joint.interfaces()).filter_map(|interface| galvanic(joint, interface)));
    found
}

/// A fluid that is reckoned to fill an opening wider than such a film is applied.
fn fluid_in_a_wide_gap(joint: &Joint, cases: &[CaseResult]) -> Option<Caution> {
    let fluid = |interface: usize| {
        let filler = joint.filler(interface)?;
        matches!(filler.kind, FillerKind::Fluid { .. }).then_some(&filler.name)
    };
    let gaps = cases.iter().flat_map(|case| {
        let interfaces = case.interfaces.iter().enumerate();
        interfaces.filter_map(|(index, found)| Some((fluid(index)?, found.gap_max?)))
    });
    let (name, gap) = gaps.max_by(|one, other| one.1.total_cmp(&other.1))?;
    (gap > FILM).then(|| {
        caution(
            "filler/fluid-in-a-wide-gap",
            format!(
                "{name} is reckoned to fill the gap everywhere, up to {:.0} µm; where less is applied, vacuum or gas \
                 crosses the rest. Take it as a paste with its applied thickness",
                gap * 1e6
            ),
        )
    })
}

/// The gas between faces whose temperature its table does not hold, in the case that is farthest out.
pub(super) fn gas_out_of_table(joint: &Joint, cases: &[CaseResult]) -> Option<Caution> {
    let Medium::Gas { gas, .. } = &joint.service.medium else {
        return None;
    };
    let (from, to) = (*gas.temperatures.first()?, *gas.temperatures.last()?);
    let met = cases.iter().flat_map(|case| {
        (0..joint.interfaces()).map(move |interface| {
            let [above, below] =
                [interface, interface + 1].map(|plate| temperatures(joint, (case, plate))[0]);
            f64::midpoint(above, below)
        })
    });
    let beyond = |temperature: f64| (from - temperature).max(temperature - to);
    let farthest = met.max_by(|one, other| beyond(*one).total_cmp(&beyond(*other)))?;
    (beyond(farthest) > 0.0).then(|| {
        caution(
            "service/gas-out-of-table",
            format!(
                "{} at {farthest:.0} K: its properties are known from {from:.0} to {to:.0} K and are held at the end of \
                 the table; too much heat crosses a gap that is colder, and none as gas where it condenses",
                gas.name
            ),
        )
    })
}

/// Mean and highest temperature of a plate, K: of the solved heat, or those of the sink where there is none.
fn temperatures(joint: &Joint, (case, index): (&CaseResult, usize)) -> [f64; 2] {
    let sink = case.sink_temperature;
    let heat = joint.service.heat.unwrap_or(0.0);
    let rises = case.temperatures.as_ref();
    let mean = rises.and_then(|rises| rises.plate_means.get(index));
    let mean = sink + heat * mean.copied().unwrap_or(0.0);
    // Of the first plate alone the hottest point is known.
    let hottest = case.rise.filter(|_| index == 0);
    let hottest = hottest.map_or(mean, |rise| sink + rise.hottest.nominal);
    [mean, hottest.max(mean)]
}

/// Pairs of families that corrode when wet, the nobler first.
const GALVANIC: &[[&str; 2]] = &[
    ["copper", "aluminium"],
    ["silver", "aluminium"],
    ["gold", "aluminium"],
    ["graphite", "aluminium"],
    ["nickel", "aluminium"],
    ["stainless", "magnesium"],
    ["copper", "magnesium"],
    ["graphite", "magnesium"],
    ["aluminium", "magnesium"],
    ["copper", "zinc"],
];

fn galvanic(joint: &Joint, interface: usize) -> Option<Caution> {
    let [above, below] = joint.meeting(interface);
    let [upper, lower] = joint.finishes(interface);
    let family = |plate: &Plate, finish: &Finish| {
        finish.coating.as_ref().map_or_else(
            || plate.material.family.clone(),
            |coating| match coating.plating.family.as_str() {
                "" => plate.material.family.clone(),
                family => family.to_owned(),
            },
        )
    };
    let [warm, cold] = [family(above, upper), family(below, lower)];
    let pair = GALVANIC.iter().find(|pair| {
        (pair[0] == warm && pair[1] == cold) || (pair[0] == cold && pair[1] == warm)
    })?;
    Some(caution(
        "material/galvanic",
        format!(
            "{} against {} corrodes where moisture reaches the joint; keep it dry, seal it or plate it",
            pair[0], pair[1]
        ),
    ))
}

fn names(plates: &[&Plate]) -> String {
    plates
        .iter()
        .map(|plate| plate.name.as_str())
        .collect::<Vec<_>>()
        .join(" and ")
}
