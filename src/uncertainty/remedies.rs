//! What to do about an input in this joint, with the numbers that its file states.

use crate::{
    joint::{Bounds, Friction, Joint, Tightening, TorqueTightening, What},
    uncertainty::Input,
};

/// The remedy of an input with the numbers of the joint; that of the input itself where the file
/// states none.
pub(super) fn remedy(joint: &Joint, input: &Input) -> String {
    let told = match input.name {
        "friction" => friction(joint),
        "torque tool" => tool(joint),
        "flatness, convex or concave" => flatness(joint),
        "roughness of the warm face" => roughness(joint, 0),
        "roughness of the cold face" => roughness(joint, 1),
        "settling and relaxation" => Some(
            "re-tighten after settling and state [losses] as measured; lengthen the grip, spare \
             soft layers under the head"
                .to_owned(),
        ),
        "thickness of the warm plate" => thickness(joint, 0),
        "thickness of the cold plate" => thickness(joint, joint.plates.len() - 1),
        "bow of the warm plate" => bow(joint, 0),
        "bow of the cold plate" => bow(joint, joint.plates.len() - 1),
        "film of the sink" => film(joint),
        "pressure of the gas" => joint.spread_of(What::GasPressure).map(|now| {
            let now = range(&scaled(&now, 1e-3));
            format!("measure or hold the pressure of service (now {now} kPa)")
        }),
        _ => None,
    };
    told.unwrap_or_else(|| input.remedy.to_owned())
}

/// The first group that is tightened by torque.
fn by_torque(joint: &Joint) -> Option<&TorqueTightening> {
    joint
        .fasteners
        .iter()
        .find_map(|group| match &group.tightening {
            Tightening::Torque(torque) => Some(torque),
            Tightening::Preload(_) => None,
        })
}

fn friction(joint: &Joint) -> Option<String> {
    let torque = by_torque(joint)?;
    let now = match torque.friction {
        Friction::Coefficients { thread, .. } => format!("thread friction now {}", range(&thread)),
        Friction::NutFactor(factor) => format!("nut factor now {}", range(&factor)),
    };
    let running = if torque.running_stated {
        ""
    } else {
        "; measure the running torque too"
    };
    Some(format!(
        "measure torque against force with the actual lubricant and lot ({now}), or tighten by \
         elongation{running}"
    ))
}

fn tool(joint: &Joint) -> Option<String> {
    let now = by_torque(joint)?.tolerance;
    (now > 0.0).then(|| {
        format!(
            "take a tool of ± {} % (now ± {} %)",
            short(50.0 * now),
            short(100.0 * now)
        )
    })
}

fn flatness(joint: &Joint) -> Option<String> {
    let now = joint.most_loose_flatness();
    (now > 0.0).then(|| {
        format!(
            "call out flatness {} mm (now {} mm), or measure the faces and state bow or flatness_map",
            short(0.5e3 * now),
            short(1e3 * now)
        )
    })
}

fn roughness(joint: &Joint, side: usize) -> Option<String> {
    let mut faces = (0..joint.interfaces())
        .filter(|interface| joint.is_bare(*interface))
        .map(|interface| joint.finishes(interface)[side].roughness);
    let now = faces.find(Bounds::is_spread)?;
    let face = ["warm", "cold"][side];
    Some(format!(
        "measure Rq of the {face} face (now {} µm), or call out a closer roughness",
        range(&scaled(&now, 1e6))
    ))
}

fn thickness(joint: &Joint, plate: usize) -> Option<String> {
    let now = joint.spread_of(What::Thickness(plate))?;
    Some(format!(
        "measure plate `{}` (now {} mm), or call out a closer tolerance",
        joint.plates[plate].name,
        range(&scaled(&now, 1e3))
    ))
}

fn bow(joint: &Joint, plate: usize) -> Option<String> {
    let now = joint.spread_of(What::Bow(plate))?;
    Some(format!(
        "measure the face of plate `{}` (now {} µm) and state a flatness_map",
        joint.plates[plate].name,
        range(&scaled(&now, 1e6))
    ))
}

fn film(joint: &Joint) -> Option<String> {
    let mut films = joint.uncertain.iter();
    let now = films
        .find(|each| matches!(each.what, What::Film(_)))?
        .bounds;
    Some(format!(
        "measure the film on a heated dummy in the flow of service (now {} W/(m²·K)), or hold the flow closer",
        range(&now)
    ))
}

/// In another unit.
fn scaled(bounds: &Bounds, factor: f64) -> Bounds {
    Bounds {
        low: bounds.low * factor,
        nominal: bounds.nominal * factor,
        high: bounds.high * factor,
        ..*bounds
    }
}

fn range(bounds: &Bounds) -> String {
    format!("{} to {}", short(bounds.low), short(bounds.high))
}

/// At most three decimals, without zeros that say nothing.
fn short(value: f64) -> String {
    let text = format!("{value:.3}");
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}
