//! Cautions of plates that break rather than yield.

use crate::{
    diagnostic::Caution,
    estimate::cautions::caution,
    joint::{Fastener, Joint},
    preload::{
        self,
        brittle::{BrittleStress, SAFETY, flattening_stress, is_brittle, tension_beside_seat},
        limits::unevenness,
        strength::seat_pressure,
    },
};

/// Every brittle plate under a group of bolts, with its stresses and what is known of its strength.
pub(super) fn plates(joint: &Joint, name: &str, fastener: &Fastener) -> Vec<Caution> {
    let brittle = (0..joint.plates.len()).filter(|plate| is_brittle(&joint.plates[*plate]));
    brittle
        .map(|plate| told(name, (joint, plate), &stresses(joint, plate, fastener)))
        .collect()
}

/// The stresses of a plate at the highest force.
fn stresses(joint: &Joint, index: usize, fastener: &Fastener) -> BrittleStress {
    let plate = &joint.plates[index];
    let far = joint.plates.len() - 1 - fastener.head_plate;
    let force = preload::force_band(fastener).high;
    let seat = if index == fastener.head_plate {
        Some(&fastener.head_seat)
    } else {
        fastener.nut_seat.as_ref().filter(|_| index == far)
    };
    let poisson = plate.material.poisson.value;
    BrittleStress {
        seat: seat.map(|seat| tension_beside_seat(seat_pressure(seat, force), poisson)),
        bending: unevenness(joint, index).map(|height| flattening_stress(plate, height)),
        strength: plate.flexural_strength,
    }
}

fn told(name: &str, (joint, index): (&Joint, usize), stress: &BrittleStress) -> Caution {
    let plate = &joint.plates[index];
    let mpa = |value: f64| format!("{:.0} MPa", value * 1e-6);
    let seat = stress.seat.map(|seat| {
        format!(
            "{} of tension beside the seat at the highest force",
            mpa(seat)
        )
    });
    let bending = match stress.bending {
        Some(bending) => format!("at most {} of bending as it is pressed flat", mpa(bending)),
        None => "no flatness is stated, so that bending is not judged".to_owned(),
    };
    let stresses: Vec<String> = seat.into_iter().chain([bending]).collect();
    let stresses = stresses.join(", ");
    let start = format!(
        "{name}: plate {} of {} breaks rather than yields: {stresses}",
        plate.name, plate.material.name
    );
    match (stress.strength, stress.used()) {
        (Some(strength), Some(used)) if used > 1.0 / SAFETY => caution(
            "preload/brittle-over",
            format!(
                "{start}; that is {:.0} % of its {}, and {:.0} % is as much as should be used; take less force, a wider \
                 soft seat, flatter faces",
                100.0 * used,
                mpa(strength),
                100.0 / SAFETY
            ),
        ),
        (Some(strength), Some(used)) => caution(
            "preload/brittle",
            format!("{start}; {:.0} % of its {}", 100.0 * used, mpa(strength)),
        ),
        _ => caution(
            "preload/brittle",
            format!("{start}; state its `flexural_strength` to have it judged"),
        ),
    }
}
