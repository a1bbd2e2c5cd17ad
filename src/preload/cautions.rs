//! What the engineer must hear about a group of bolts, the gravest first.

use crate::{
    catalog::MaterialKind,
    diagnostic::Caution,
    joint::{Engagement, Fastener, Friction, LockWasher, Tightening, TorqueTightening},
    preload::{
        engagement::engagement_check,
        force::{Place, force_band},
        limits::{self, LimitUse, Supports, UTILISATION, largest_torque, limits, strength_use},
        strength::seat_pressure,
    },
};

mod service;

pub use service::{hardly_clamped, opened, over_in_service, parts, springs_flat};

/// Strength use at nominal below which a wrong size or unit is likelier than a choice.
const LOW_USE: f64 = 0.15;

/// A torque this many times the largest one was probably meant in in·lbf: N·m over in·lbf is 8.85.
const FAR_ABOVE: f64 = 3.0;

/// A torque this part of the largest one was probably meant in N·m.
const FAR_BELOW: f64 = 1.0 / 6.0;

/// Ratio of highest to lowest force beyond which no torque wrench should scatter: `α_A` of an impact wrench.
const WIDE_SCATTER: f64 = 2.5;

/// Friction from which a stainless pair counts as dry.
const DRY: f64 = 0.2;

/// A group of bolts under judgement.
#[derive(Clone, Copy, Debug)]
pub struct Group<'a> {
    /// Name for people: `M4 socket, 6 places`.
    pub name: &'a str,
    /// The fastener.
    pub fastener: &'a Fastener,
    /// What it presses on and is screwed into.
    pub supports: &'a Supports,
}

/// Cautions of one group, gravest first.
pub fn group_cautions(group: &Group<'_>) -> Vec<Caution> {
    let mut found = Vec::new();
    found.extend(over_strength(group));
    found.extend(torque_size(group));
    found.extend(seats(group));
    found.extend(isolating(group));
    found.extend(split_washer(group));
    found.extend(threads(group));
    found.extend(tightening(group));
    found
}

/// Cautions that belong to a printed torque window, with its largest torque, N m, and the limit that ends
/// it: of tightening and of service.
pub fn window_cautions(group: &Group<'_>, largest: Option<(f64, &'static str)>) -> Vec<Caution> {
    let name = group.name;
    let mut found = Vec::new();
    if let Some((torque, limit)) = largest {
        found.push(caution(
            "preload/no-torque-card",
            format!(
                "{name}: {torque:.3} N·m is estimated from minimum strengths and ends at {limit}; tightening and service \
                 under the stated loads and temperatures were looked at. It replaces neither the torque card of the \
                 product nor a trial on the real stack."
            ),
        ));
    } else if let Some((torque, _)) = largest_torque(group.fastener, group.supports) {
        found.push(caution(
            "preload/no-torque-card",
            format!(
                "{name}: tightening alone would bear {torque:.3} N·m, but at no torque does the bolt hold in service under \
                 the stated loads and temperatures: no torque is to be released."
            ),
        ));
    }
    found.push(caution(
        "preload/slip-and-fatigue",
        format!(
            "{name}: slip, fatigue, vibration and loads across the bolts are not in these limits."
        ),
    ));
    found
}

fn over_strength(group: &Group<'_>) -> Vec<Caution> {
    let Group { name, fastener, .. } = group;
    let mut found = Vec::new();
    let used = strength_use(fastener);
    match used {
        None => found.push(caution(
            "preload/no-yield-strength",
            format!(
                "{name}: grade {} has no yield strength here, so neither strength use nor largest torque can be \
                 given; take it from the part specification.",
                fastener.grade.name
            ),
        )),
        Some([nominal, high]) if high > 1.0 => found.push(caution(
            "preload/over-yield",
            format!(
                "{name}: at the highest force the combined stress is {:.0} % of yield ({:.0} % at nominal); the bolt \
                 yields. Lower the torque, narrow the friction or take a stronger grade.",
                100.0 * high,
                100.0 * nominal
            ),
        )),
        Some([_, high]) if high > UTILISATION => found.push(caution(
            "preload/over-90-percent",
            format!(
                "{name}: at the highest force the combined stress is {:.0} % of yield; more than 90 % needs control \
                 by angle or yield.",
                100.0 * high
            ),
        )),
        Some(_) => {}
    }
    let failed: Vec<LimitUse> = limits(fastener, group.supports)
        .into_iter()
        .filter(|limit| !limit.passes)
        .collect();
    if let Some(proof) = failed.iter().find(|limit| limit.name == limits::PROOF) {
        found.push(caution(
            "preload/over-proof",
            format!(
                "{name}: the highest force is {:.0} % of the proof load.",
                100.0 * proof.used
            ),
        ));
    }
    // Between 90 and 100 % of yield the caution above says enough.
    if let Some(worst) = failed.iter().find(|limit| limit.used > 1.0) {
        found.push(caution(
            "preload/never-for-conductance",
            format!(
                "{name}: {} does not hold; never buy conductance with torque beyond what bolt and plate bear.",
                worst.name
            ),
        ));
    }
    found
}

fn torque_size(group: &Group<'_>) -> Option<Caution> {
    let Group { name, fastener, .. } = group;
    let largest = largest_torque(fastener, group.supports);
    if let (Tightening::Torque(tightening), Some((largest, _))) = (&fastener.tightening, largest) {
        let (torque, ratio) = (tightening.torque, tightening.torque / largest);
        if !(FAR_BELOW..=FAR_ABOVE).contains(&ratio) {
            let side = if ratio > FAR_ABOVE {
                format!("{ratio:.1} times the largest torque")
            } else {
                format!("{:.0} % of the largest torque", 100.0 * ratio)
            };
            return Some(caution(
                "preload/suspicious-torque",
                format!(
                    "{name}: {torque:.3} N·m is {side} this {} {} bears ({largest:.3} N·m). N·m or in·lbf? \
                     1 N·m is 8.85 in·lbf.",
                    fastener.thread.name, fastener.grade.name
                ),
            ));
        }
    }
    let [nominal, _] = strength_use(fastener)?;
    (nominal < LOW_USE).then(|| {
        caution(
            "preload/low-use",
            format!(
                "{name}: the nominal stress is only {:.0} % of yield; check size, grade and the unit of the torque or \
                 preload.",
                100.0 * nominal
            ),
        )
    })
}

fn seats(group: &Group<'_>) -> Vec<Caution> {
    let Group { name, fastener, .. } = group;
    let high = force_band(fastener).high;
    let mut found = Vec::new();
    let faces = [
        ("head", Some(&fastener.head_seat), group.supports.head_limit),
        ("nut", fastener.nut_seat.as_ref(), group.supports.nut_limit),
    ];
    let mut unknown = Vec::new();
    for (face, seat, limit) in faces {
        match (seat, limit) {
            (Some(seat), Some(limit)) if seat_pressure(seat, high) > limit => found.push(caution(
                "preload/head-pressure",
                format!(
                    "{name}: {:.0} MPa under the {face} at the highest force, the plate bears {:.0} MPa; it will be \
                     indented and settle. A washer helps more than torque does.",
                    seat_pressure(seat, high) * 1e-6,
                    limit * 1e-6
                ),
            )),
            (Some(_), None) => unknown.push(face),
            _ => {}
        }
    }
    if !unknown.is_empty() {
        found.push(caution(
            "preload/no-bearing-limit",
            format!(
                "{name}: no permissible pressure is known for the plate under the {}; the pressure there is not judged.",
                unknown.join(" and the ")
            ),
        ));
    }
    if fastener.conical_seat {
        found.push(caution(
            "preload/countersunk",
            format!(
                "{name}: a countersunk head wedges; its friction radius is divided by sin 45°, and the flat annulus \
                 taken for its seat is an approximation."
            ),
        ));
    }
    found
}

/// What a split spring washer does not do.
fn split_washer(group: &Group<'_>) -> Option<Caution> {
    (group.fastener.lock_washer == LockWasher::Split).then(|| {
        caution(
            "preload/split-washer",
            format!(
                "{}: a split spring washer is flat at a small part of the clamp force and then a hard, narrow seat; it adds \
                 nothing to the force kept, and nothing is counted. Disc springs and a longer bolt keep force.",
                group.name
            ),
        )
    })
}

/// What isolating washers do to the clamp.
fn isolating(group: &Group<'_>) -> Vec<Caution> {
    let Group { name, fastener, .. } = group;
    let Some(washers) = &fastener.isolating else {
        return Vec::new();
    };
    let material = &washers.material;
    let pressure = force_band(fastener).high / fastener.head_seat.area();
    let mut found = Vec::new();
    if material.kind == MaterialKind::Polymer {
        found.push(caution(
            "preload/isolating-creep",
            format!(
                "{name}: {:.1} mm of {} stand in the clamp under {:.0} MPa: it creeps, the more the warmer, and the \
                 clamp force falls with it; the loss is not counted. Re-tighten, or take disc springs or a ceramic.",
                washers.height() * 1e3,
                material.name,
                pressure * 1e-6
            ),
        ));
    }
    let limit = material.bearing_limit.as_ref();
    let limit = limit.or(material.yield_strength.as_ref());
    if let Some(limit) = limit.filter(|limit| pressure > limit.value) {
        found.push(caution(
            "preload/head-pressure",
            format!(
                "{name}: {:.0} MPa on the isolating washers at the highest force, {} bears {:.0} MPa; they will be \
                 crushed. A larger seat helps: state `bearing`.",
                pressure * 1e-6,
                material.name,
                limit.value * 1e-6
            ),
        ));
    }
    found
}

fn threads(group: &Group<'_>) -> Vec<Caution> {
    let Group { name, fastener, .. } = group;
    let mut found = Vec::new();
    if let Some(check) = engagement_check(fastener, &group.supports.far)
        && check.is_short()
    {
        let required = check
            .required
            .map(|length| format!(", {:.1} mm for the bolt to break first", length * 1e3))
            .unwrap_or_default();
        found.push(caution(
            "preload/short-engagement",
            format!(
                "{name}: {:.1} mm of thread engaged; the rule of thumb asks {:.1} mm{required}.",
                check.length * 1e3,
                check.rule * 1e3
            ),
        ));
    }
    let hold = &fastener.insert_hold;
    let held = hold.pull_out.is_some() || hold.outer_diameter.is_some();
    let text = match (fastener.engagement, held, fastener.flange.is_some()) {
        (Engagement::Insert { .. }, false, true) => {
            "pull-out of the insert is not checked; state the maker's `pull_out` load."
        }
        (Engagement::Insert { .. }, false, false) => {
            "pull-out of the insert and an insert standing proud of the face are not checked; state the maker's \
             `pull_out` load and seat it below the face, or state its `flange` and how `proud` it is."
        }
        (Engagement::Insert { .. }, true, false) => {
            "an insert standing proud of the face is not checked; seat it below the face, or state its `flange` and how \
             `proud` it is."
        }
        _ => "",
    };
    if !text.is_empty() {
        found.push(caution("preload/insert", format!("{name}: {text}")));
    }
    let stainless = ["304", "316", "a2", "a4", "18-8"]
        .iter()
        .any(|word| fastener.grade.like.to_lowercase().contains(word));
    let galls = match fastener.engagement {
        Engagement::Tapped { .. } => group.supports.far.family == "stainless",
        Engagement::Insert { .. } => false,
        Engagement::Nut => dry(fastener),
    };
    if stainless && galls {
        found.push(caution(
            "preload/galling",
            format!(
                "{name}: stainless turns on stainless and may gall; lubricate and turn slowly. A seizing thread \
                 takes torque without clamping."
            ),
        ));
    }
    if fastener.thread.diameter < 3.99e-3 {
        found.push(caution(
            "preload/settling-small-screw",
            format!(
                "{name}: guide values of settling start at M4; a {} may lose far more of its force. Measure, or \
                 tighten again after thermal cycling.",
                fastener.thread.name
            ),
        ));
    }
    found
}

fn tightening(group: &Group<'_>) -> Vec<Caution> {
    let Group { name, fastener, .. } = group;
    let mut found = Vec::new();
    let Tightening::Torque(tightening) = &fastener.tightening else {
        return found;
    };
    if let Some(text) = running(fastener, tightening) {
        found.push(caution("preload/running-torque", format!("{name}: {text}")));
    }
    let band = force_band(fastener);
    if band.high > WIDE_SCATTER * band.low {
        found.push(caution(
            "preload/friction-scatter",
            format!(
                "{name}: one torque gives {:.0} to {:.0} N, wider than an uncontrolled impact wrench; narrow the \
                 friction by a lubricant of known class or measure the preload.",
                band.low, band.high
            ),
        ));
    }
    found
}

/// Trouble with the running torque, if any.
fn running(fastener: &Fastener, tightening: &TorqueTightening) -> Option<String> {
    let share = tightening.running / tightening.torque;
    if share >= 1.0 {
        return Some(format!(
            "the running torque of {:.3} N·m eats the whole {:.3} N·m; nothing is clamped.",
            tightening.running, tightening.torque
        ));
    }
    if share > 0.25 {
        let scatter = match tightening.running_spread {
            Some(_) => "its stated scatter moves",
            None => "its scatter, not counted here, moves",
        };
        return Some(format!(
            "the running torque takes {:.0} % of the torque; {scatter} the force as much.",
            100.0 * share
        ));
    }
    let insert = matches!(fastener.engagement, Engagement::Insert { .. });
    (insert && !tightening.running_stated).then(|| {
        "no running torque is stated; if the insert locks, measure it and state it, or the force is overrated.".into()
    })
}

fn dry(fastener: &Fastener) -> bool {
    let Tightening::Torque(tightening) = &fastener.tightening else {
        return false;
    };
    match &tightening.friction {
        Friction::Coefficients { thread, .. } => thread.at(Place::NOMINAL.friction) >= DRY,
        // K 0.25 is about μ 0.2 for every size.
        Friction::NutFactor(factor) => factor.nominal >= 0.25,
    }
}

fn caution(code: &'static str, text: String) -> Caution {
    Caution { code, text }
}

#[cfg(test)]
mod tests;
