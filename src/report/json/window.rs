//! The torque window and what a load along the bolts does, as JSON.

use crate::{
    estimate::{End, Judged, Range, Side, TorqueLimit, TorqueWindow},
    joint::Bounds,
    preload::Shared,
};
use serde_json::{Value, json};

/// The torques that heat and strength allow, N m; `both` is null where there is no window.
pub(super) fn window(window: &TorqueWindow) -> Value {
    let trials = window.trials.iter().map(|trial| {
        json!({
            "change": trial.change,
            "window": trial.window.as_ref().map(range),
            "judged": match &trial.judged {
                Judged::AsSwept => "as swept",
                Judged::Fast => "solved anew, fast",
                Judged::Refused(_) => "not possible",
            },
            "why": match &trial.judged {
                Judged::Refused(why) => Some(why),
                Judged::AsSwept | Judged::Fast => None,
            },
        })
    });
    json!({
        "confidence": window.confidence,
        "knee": window.knee,
        "limits": limits(&window.limits),
        "strength": window.strength.as_ref().map(range),
        "heat": window.heat.as_ref().map(|heat| heat.iter().map(range).collect::<Value>()),
        "both": window.both.as_ref().map(range),
        "trusted": window.trusted,
        "perfect_contact_fails": window.plates_fail,
        "force_ratio": window.force_ratio,
        "larger_thread": window.larger_thread,
        "trials": trials.collect::<Value>(),
    })
}

/// Limits of the torque, N m.
pub(super) fn limits(limits: &[TorqueLimit]) -> Value {
    let limits = limits.iter().map(|limit| {
        json!({
            "name": limit.name,
            "torque": limit.torque,
            "side": match limit.side {
                Side::Least => "least",
                Side::Most => "most",
            },
        })
    });
    limits.collect()
}

fn range(range: &Range) -> Value {
    let end = |end: End| json!({ "torque": end.torque, "by": end.by });
    json!({ "low": end(range.low), "high": end(range.high) })
}

/// A load along a bolt in one case: forces in N; `separation` is null where nothing parts the faces.
pub(super) fn axial(shared: &Shared) -> Value {
    let bounds =
        |each: Bounds| json!({ "low": each.low, "nominal": each.nominal, "high": each.high });
    json!({
        "load": bounds(shared.load),
        "load_factor": bounds(shared.load_factor),
        "bolt_force": shared.bolt_force,
        "residual": bounds(shared.residual),
        "separation": shared.separation,
    })
}
