//! Joints side by side as JSON.

use serde_json::{Value, json};

use crate::{
    report::{
        comparison::{lost, strength},
        json::{FORMAT, estimate},
    },
    uncertainty::{Compared, Comparison, Sense, Verdict},
};

/// The comparison: every joint with its whole estimate, SI.
pub fn comparison(found: &Comparison) -> Value {
    json!({
        "ringsum": env!("CARGO_PKG_VERSION"),
        "units": "SI",
        "format": FORMAT,
        "best": found.joints.get(found.best).map(|joint| &joint.name),
        "sense": match found.sense {
            Sense::Pass => "least source to sink",
            Sense::Resist => "largest source to sink",
        },
        "joints": found.joints.iter().map(joint).collect::<Vec<Value>>(),
    })
}

fn joint(joint: &Compared) -> Value {
    json!({
        "name": joint.name,
        "case": joint.worst().map(|case| case.name),
        "bolts": joint.bolts,
        "strength_use": strength(joint),
        "mass": {
            "fasteners": joint.mass.fasteners,
            "plates": joint.mass.plates,
            "fillers": joint.mass.fillers,
            "total": joint.mass.total(),
            "left_out": joint.mass.left_out,
        },
        "cost": joint.cost,
        "worst_loss": joint.loss.as_ref().map(|loss| json!({
            "bolt": loss.bolt,
            "alike": loss.alike,
            "growth": loss.growth,
            "source_to_sink": lost(joint),
            "resolution": loss.resolution,
            "failure": loss.failure,
        })),
        "best_beats_it": joint.odds,
        "verdict": joint.verdict.map(|verdict| match verdict {
            Verdict::Surely => "surely better",
            Verdict::Likely => "likely better",
            Verdict::Even => "does not matter",
            Verdict::WithinError => "within numerical error",
            Verdict::AtNominal => "better at nominal",
        }),
        "estimate": estimate(&joint.estimate),
    })
}
