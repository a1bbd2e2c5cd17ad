//! Resistance against torque as JSON.

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    estimate::{Minimum, TorquePoint, TorqueSweep},
    report::json::{
        shapes::{
            CautionTold, ForceEnds, HEAD, Head, ResistanceEnds, StrengthUse, bound, cautions,
        },
        window::{self, LimitTold, WindowTold},
    },
};

/// What `torque --json` prints of a joint.
#[derive(Serialize, JsonSchema)]
pub struct TorqueResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The joint file
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "String")]
    file: Option<String>,
    /// Title of the joint
    title: String,
    /// The group of fasteners that is varied
    group: String,
    /// The thermal case that stands worst
    #[schemars(extend("enum" = ["service", "hot", "cold"]))]
    case: &'static str,
    /// The field of pressure
    #[schemars(extend("enum" = ["elastic", "cone"]))]
    field: &'static str,
    /// How finely it is solved
    #[schemars(extend("enum" = ["fast", "normal", "fine"]))]
    resolution: &'static str,
    /// Torque that the file states, N m
    stated: f64,
    /// How the stated torque stands to the window
    stated_stands: StatedStands,
    /// Whether faces may be bent either way, so that low and high hold for each
    bends: bool,
    /// Largest torque that passes every limit; null where none does or none can be judged
    largest: Option<LargestTorque>,
    /// Torque of the best source to sink that strength and separation allow, N m; null where they allow none
    best: Option<f64>,
    /// Lowest point of the curve between swept torques; null where it has none inside the window
    minimum: Option<TorqueAt>,
    /// The joint at the stated torque
    at_stated: AtStated,
    /// The joint where strength ends or separation begins; null where that is not the best or stands in a row
    at_limit: Option<TorqueAt>,
    /// The requirement as a resistance; null where none is stated or none can be put so
    required: Option<RequiredResistance>,
    /// Torques, rising
    points: Vec<PointTold>,
    /// Torques that heat and strength allow
    window: WindowTold,
    /// Cautions, the gravest first
    cautions: Vec<CautionTold>,
}

/// How the stated torque stands to the window.
#[derive(Serialize, JsonSchema)]
struct StatedStands {
    /// Whether it lies inside what heat and strength allow; null where there is no window, and where it was not swept and breaks no limit
    inside: Option<bool>,
    /// Limits of strength and separation that it breaks
    breaks: Vec<LimitTold>,
    /// Whether it meets the requirement; null where nothing is required and where it was not swept
    requirement_met: Option<bool>,
}

/// The largest torque that passes every limit.
#[derive(Serialize, JsonSchema)]
struct LargestTorque {
    /// Torque, N m
    torque: f64,
    /// The limit that ends it
    limit: &'static str,
}

/// The joint at one torque, at nominal inputs.
#[derive(Serialize, JsonSchema)]
struct TorqueAt {
    /// Torque, N m
    torque: f64,
    /// Heated zone to sink surface, K/W
    source_to_sink: f64,
    /// What the joint adds, K/W
    added_by_joint: f64,
}

/// The joint at the stated torque.
#[derive(Serialize, JsonSchema)]
struct AtStated {
    /// Heated zone to sink surface, K/W
    source_to_sink: f64,
}

/// The requirement as source to sink.
#[derive(Serialize, JsonSchema)]
struct RequiredResistance {
    /// Resistance, K/W
    resistance: f64,
    /// Side of the limit
    #[schemars(extend("enum" = ["most", "least"]))]
    bound: &'static str,
}

/// One torque.
#[derive(Serialize, JsonSchema)]
struct PointTold {
    /// Torque, N m
    torque: f64,
    /// Clamp force at assembly, N
    force: ForceEnds,
    /// Heated zone to sink surface
    source_to_sink: ResistanceEnds,
    /// Faying faces alone
    contact: ResistanceEnds,
    /// What the joint adds
    added_by_joint: ResistanceEnds,
    /// Stress over yield at assembly; null without a yield strength
    strength_use: Option<StrengthUse>,
    /// Whether every limit of strength holds
    passes: bool,
}

/// Resistance against torque.
pub fn torque(sweep: &TorqueSweep) -> Value {
    json!(told(sweep))
}

fn told(sweep: &TorqueSweep) -> TorqueResult {
    let broken = sweep.window.broken_at(sweep.stated);
    // What was not swept is not known, unless strength forbids it.
    let known = sweep.sweeps(sweep.stated) || !broken.is_empty();
    let both = sweep.window.both.filter(|_| known);
    let inside =
        both.map(|both| both.low.torque <= sweep.stated && sweep.stated <= both.high.torque);
    TorqueResult {
        head: HEAD,
        file: None,
        title: sweep.title.clone(),
        group: sweep.group.clone(),
        case: sweep.case,
        field: sweep.field,
        resolution: sweep.resolution,
        stated: sweep.stated,
        stated_stands: StatedStands {
            inside,
            breaks: window::limits(&broken),
            requirement_met: sweep.heat_met_at(sweep.stated),
        },
        bends: sweep.bends,
        largest: sweep
            .largest
            .map(|(torque, limit)| LargestTorque { torque, limit }),
        best: sweep.best,
        minimum: sweep.minimum.map(at),
        at_stated: AtStated {
            source_to_sink: sweep.at_stated,
        },
        at_limit: sweep.at_limit.map(at),
        required: sweep.required.map(|(resistance, side)| RequiredResistance {
            resistance,
            bound: bound(side),
        }),
        points: sweep.points.iter().map(point).collect(),
        window: window::window(&sweep.window),
        cautions: cautions(&sweep.cautions),
    }
}

fn at(found: Minimum) -> TorqueAt {
    TorqueAt {
        torque: found.torque,
        source_to_sink: found.source_to_sink,
        added_by_joint: found.added_by_joint,
    }
}

fn point(point: &TorquePoint) -> PointTold {
    PointTold {
        torque: point.torque,
        force: (&point.force).into(),
        source_to_sink: (&point.source_to_sink).into(),
        contact: (&point.contact).into(),
        added_by_joint: (&point.added_by_joint).into(),
        strength_use: point.strength_use.map(StrengthUse::from),
        passes: point.passes,
    }
}
