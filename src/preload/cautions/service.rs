//! What the engineer must hear of a bolt in service: lost clamp, load, springs.

use crate::{
    diagnostic::Caution,
    joint::{Bounds, Fastener},
    preload::{cautions::caution, external::Shared, limits::LimitUse, springs::SpringStack},
};

/// Share of its force below which what a bolt keeps is within the doubt of the guide values of settling.
/// House rule, no source.
const LEAST_KEPT: f64 = 0.1;

/// Caution for a bolt whose balance of losses is negative, N.
pub fn opened(name: &str, balance: f64) -> Option<Caution> {
    (balance < 0.0).then(|| {
        caution(
            "preload/negative-service-force",
            format!(
                "{name}: settling, relaxation and temperature take {:.0} N more than the bolt was tightened to; \
                 the joint is taken as open there (0 N). Use a longer or less stiff bolt, a higher preload or \
                 matched expansion.",
                -balance
            ),
        )
    })
}

/// Caution for a bolt that keeps next to nothing of the force it was tightened to, N.
pub fn hardly_clamped(name: &str, [tightened, left]: [f64; 2]) -> Option<Caution> {
    (0.0..LEAST_KEPT * tightened).contains(&left).then(|| {
        caution(
            "preload/hardly-clamped",
            format!(
                "{name}: settling, relaxation and temperature leave {left:.0} N of {tightened:.0} N, \
                 {:.1} %; a little more of any of them opens the joint. Use a longer or less stiff bolt, a \
                 higher preload or matched expansion.",
                100.0 * left / tightened
            ),
        )
    })
}

/// Caution for disc springs that lie flat at the nominal or the largest force in service, N.
pub fn springs_flat(label: &str, (fastener, clamp): (&Fastener, Bounds)) -> Option<Caution> {
    let flat = SpringStack::from(fastener.disc_springs.as_ref()?).flat_force();
    let state = if clamp.nominal >= flat {
        "lie flat and are no longer springs"
    } else if clamp.high >= flat {
        "lie flat at the largest force"
    } else {
        return None;
    };
    Some(caution(
        "preload/springs-flat",
        format!(
            "{label}: the disc springs are flat from {flat:.0} N; at {:.0} N ({:.0} N at most) they {state}, and losses act as on \
             a stiff bolt. Nest more discs, take thicker ones or less force.",
            clamp.nominal, clamp.high
        ),
    ))
}

/// Caution for a load under which the faces may part.
pub fn parts(label: &str, (fastener, shared): (&Fastener, &Shared)) -> Option<Caution> {
    let safety = fastener.axial_load.as_ref()?.safety;
    (shared.separation < safety).then(|| {
        let left = if shared.residual.low > 0.0 {
            format!("leaves {:.0} N between the faces", shared.residual.low)
        } else {
            "parts the faces".to_owned()
        };
        caution(
            "preload/separation",
            format!(
                "{label}: at the least clamp force a load of {:.0} N on each bolt {left}; the faces part at {:.2} times the load, \
                 {safety} times is asked. Raise the preload within its limits, take more bolts, or spread the load.",
                shared.load.high, shared.separation
            ),
        )
    })
}

/// Caution for a bolt that passes a limit in service although it holds at assembly or not.
pub fn over_in_service(name: &str, limits: &[LimitUse]) -> Option<Caution> {
    let worst = limits
        .iter()
        .filter(|limit| !limit.passes)
        .max_by(|one, other| one.used.total_cmp(&other.used))?;
    Some(caution(
        "preload/over-in-service",
        format!(
            "{name}: in the worst case load and temperature bring the bolt to {:.0} % of its {}; lower the torque, \
             soften the stack or take a stronger or larger bolt.",
            100.0 * worst.used,
            worst.name
        ),
    ))
}
