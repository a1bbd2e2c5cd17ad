//! Heads and nuts over feet: whether the force goes straight down into one.

use crate::{
    diagnostic::Caution,
    estimate::{cautions::caution, group_label},
    joint::{Fastener, Joint, Seat},
};

/// Share of a seat over feet above which the force counts as going straight down (judgement).
const ON_FOOT: f64 = 0.9;
/// Rings and rays at which a seat is looked at.
const RINGS: usize = 12;
const RAYS: usize = 48;

/// Bolts whose head or nut lies beside the feet, or partly so.
pub(super) fn head_off_foot(joint: &Joint, fastener: &Fastener) -> Option<Caution> {
    if joint.plates.iter().all(|plate| plate.feet.is_none()) {
        return None;
    }
    let seats = std::iter::once(fastener.head_seat).chain(fastener.nut_seat);
    let shares: Vec<f64> = fastener
        .places
        .iter()
        .map(|at| {
            let each = seats.clone().map(|seat| share_over_feet(joint, *at, seat));
            each.fold(1.0, f64::min)
        })
        .filter(|share| *share < ON_FOOT)
        .collect();
    let least = shares.iter().copied().reduce(f64::min)?;
    Some(caution(
        "pressure/head-off-foot",
        format!(
            "{}: at {} of these head or nut does not stand over a foot, at worst only {:.0} % of its seat does: the bolt \
             bends the plate beside the foot; its stress, and plates that meet beside feet, are not checked",
            group_label(fastener),
            shares.len(),
            100.0 * least
        ),
    ))
}

/// Share of a seat's area below which every plate stands on a foot, 0 to 1.
fn share_over_feet(joint: &Joint, at: [f64; 2], seat: Seat) -> f64 {
    let (mut over, mut whole) = (0.0, 0.0);
    for ring in 0..RINGS {
        let place = (ring as f64 + 0.5) / RINGS as f64;
        let radius = seat.inner_radius + place * (seat.outer_radius - seat.inner_radius);
        for ray in 0..RAYS {
            let (sine, cosine) = (std::f64::consts::TAU * ray as f64 / RAYS as f64).sin_cos();
            let point = [at[0] + radius * cosine, at[1] + radius * sine];
            whole += radius;
            if joint.plates.iter().all(|plate| plate.stands_at(point)) {
                over += radius;
            }
        }
    }
    over / whole
}
