//! Joints side by side as JSON.

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    joint::Mass,
    report::{
        comparison::{lost, strength},
        json::{EstimateResult, HEAD, Head, estimate},
    },
    uncertainty::{Compared, Comparison, Sense, Verdict},
};

/// What `compare --json` prints.
#[derive(Serialize, JsonSchema)]
pub struct CompareResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// Name of the best joint at nominal; null where there is none
    best: Option<String>,
    /// What best means
    #[schemars(extend("enum" = ["least source to sink", "largest source to sink"]))]
    sense: &'static str,
    /// The joints in the order given
    joints: Vec<ComparedTold>,
}

/// One of the joints.
#[derive(Serialize, JsonSchema)]
struct ComparedTold {
    /// File, and variant where there are some
    name: String,
    /// The thermal case it stands worst in, which is compared; null where it has none
    #[schemars(extend("enum" = ["service", "hot", "cold", null]))]
    case: Option<&'static str>,
    /// Number of bolts that clamp
    bolts: usize,
    /// Largest stress over yield at assembly, share of 1; null without a yield strength
    strength_use: Option<f64>,
    /// What it weighs
    mass: MassTold,
    /// What it costs by the user's own measure; null where none is stated
    cost: Option<f64>,
    /// The single lost bolt that costs most; null for one bolt and where it was not asked for
    worst_loss: Option<LossTold>,
    /// Odds that the best joint beats this one, 0 to 1; null without draws and for the best itself
    best_beats_it: Option<f64>,
    /// What that says; null for the best itself
    #[schemars(extend("enum" = [
        "surely better", "likely better", "does not matter", "within numerical error", "better at nominal", null
    ]))]
    verdict: Option<&'static str>,
    /// What `estimate` says of it
    estimate: EstimateResult,
}

/// What a joint weighs.
#[derive(Serialize, JsonSchema)]
struct MassTold {
    /// Bolts with heads, nuts and washers, kg
    fasteners: f64,
    /// Plates without their holes, kg
    plates: f64,
    /// Layers between the faces, kg
    fillers: f64,
    /// All that is counted, kg
    total: f64,
    /// What is not counted, in words
    left_out: Vec<String>,
}

/// The loss of one bolt.
#[derive(Serialize, JsonSchema)]
struct LossTold {
    /// Number of the bolt, counted from 1 in the order of the file
    bolt: usize,
    /// How many bolts stand like it, itself included
    alike: usize,
    /// Source to sink without it over that with all bolts, 1; null where the joint then has no solution
    growth: Option<f64>,
    /// Source to sink without it, K/W; null likewise
    source_to_sink: Option<f64>,
    /// How finely both were solved
    #[schemars(extend("enum" = ["fast", "normal", "fine"]))]
    resolution: &'static str,
    /// Why there is no solution; null where there is one
    failure: Option<String>,
}

/// The comparison: every joint with its whole estimate, SI.
pub fn comparison(found: &Comparison) -> Value {
    let best = found.joints.get(found.best);
    json!(CompareResult {
        head: HEAD,
        best: best.map(|joint| joint.name.clone()),
        sense: match found.sense {
            Sense::Pass => "least source to sink",
            Sense::Resist => "largest source to sink",
        },
        joints: found.joints.iter().map(joint).collect(),
    })
}

fn joint(joint: &Compared) -> ComparedTold {
    ComparedTold {
        name: joint.name.clone(),
        case: joint.worst().map(|case| case.name),
        bolts: joint.bolts,
        strength_use: strength(joint),
        mass: mass(&joint.mass),
        cost: joint.cost,
        worst_loss: joint.loss.as_ref().map(|loss| LossTold {
            bolt: loss.bolt,
            alike: loss.alike,
            growth: loss.growth,
            source_to_sink: lost(joint),
            resolution: loss.resolution,
            failure: loss.failure.clone(),
        }),
        best_beats_it: joint.odds,
        verdict: joint.verdict.map(|verdict| match verdict {
            Verdict::Surely => "surely better",
            Verdict::Likely => "likely better",
            Verdict::Even => "does not matter",
            Verdict::WithinError => "within numerical error",
            Verdict::AtNominal => "better at nominal",
        }),
        estimate: estimate::told(&joint.estimate),
    }
}

fn mass(mass: &Mass) -> MassTold {
    MassTold {
        fasteners: mass.fasteners,
        plates: mass.plates,
        fillers: mass.fillers,
        total: mass.total(),
        left_out: mass.left_out.clone(),
    }
}
