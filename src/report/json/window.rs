//! The torque window and what a load along the bolts does, as JSON.

use schemars::JsonSchema;
use serde::Serialize;

use crate::{
    estimate::{End, Judged, Range, Side, TorqueLimit, TorqueWindow, Trial},
    joint::Bounds,
    preload::Shared,
};

/// The torques that heat and strength allow.
#[derive(Serialize, JsonSchema)]
pub struct WindowTold {
    /// Share of the draws that the band holds, 0 to 1; null without draws
    confidence: Option<f64>,
    /// Torque at which the joint conducts 90 % of what it does at the best, N m; null where it does below the first one swept
    knee: Option<f64>,
    /// Every limit of strength and separation, torque rising
    limits: Vec<LimitTold>,
    /// What strength and separation allow; null where no torque passes or none can be judged
    strength: Option<RangeTold>,
    /// Ranges that meet the requirement at the unfavourable end, rising; null where nothing is required
    heat: Option<Vec<RangeTold>>,
    /// What both allow, the widest part; null where there is no window
    both: Option<RangeTold>,
    /// Whether numerical error and flatness leave the verdict of the heat sure
    trusted: bool,
    /// Whether even perfect contact fails the requirement at nominal
    perfect_contact_fails: bool,
    /// Force that the heat asks for over that which strength allows, share of 1; null where the heat asks for no more
    force_ratio: Option<f64>,
    /// The next thread that carries that force in the same grade; null as above and where there is none
    larger_thread: Option<String>,
    /// Changes tried where the window is shut
    trials: Vec<TrialTold>,
}

/// A limit of the torque.
#[derive(Serialize, JsonSchema)]
pub struct LimitTold {
    /// Its name
    name: &'static str,
    /// Torque, N m
    torque: f64,
    /// Whether the torque must be at least or at most so large
    #[schemars(extend("enum" = ["least", "most"]))]
    side: &'static str,
}

/// A range of torque.
#[derive(Serialize, JsonSchema)]
struct RangeTold {
    /// Its lower end
    low: EndTold,
    /// Its upper end
    high: EndTold,
}

/// An end of a range of torque.
#[derive(Serialize, JsonSchema)]
struct EndTold {
    /// Torque, N m
    torque: f64,
    /// What ends the range there
    by: &'static str,
}

/// A change tried where the window is shut.
#[derive(Serialize, JsonSchema)]
struct TrialTold {
    /// The change
    change: String,
    /// The window with it; null where it stays shut
    window: Option<RangeTold>,
    /// On what it was judged
    #[schemars(extend("enum" = ["as swept", "solved anew, fast", "not possible"]))]
    judged: &'static str,
    /// Why it is not possible; null where it is
    why: Option<String>,
}

/// What a load along a bolt does in one case.
#[derive(Serialize, JsonSchema)]
pub struct AxialTold {
    /// Load, N
    load: BoundsOf,
    /// Share of the load that the bolt feels, 1
    load_factor: BoundsOf,
    /// Highest force of the bolt, N
    bolt_force: f64,
    /// Clamp force left under the load, N; negative where the faces would part
    residual: BoundsOf,
    /// Factor by which the load may grow before the faces part, 1; null where nothing parts them
    #[schemars(with = "Option<f64>")]
    separation: f64,
}

/// Low, nominal and high of a stated value or of what follows from it.
#[derive(Serialize, JsonSchema)]
struct BoundsOf {
    /// Lowest
    low: f64,
    /// Nominal
    nominal: f64,
    /// Highest
    high: f64,
}

impl From<Bounds> for BoundsOf {
    fn from(bounds: Bounds) -> Self {
        Self {
            low: bounds.low,
            nominal: bounds.nominal,
            high: bounds.high,
        }
    }
}

/// The torques that heat and strength allow, N m; `both` is null where there is no window.
pub(super) fn window(window: &TorqueWindow) -> WindowTold {
    let heat = window.heat.as_ref();
    WindowTold {
        confidence: window.confidence,
        knee: window.knee,
        limits: limits(&window.limits),
        strength: window.strength.as_ref().map(range),
        heat: heat.map(|heat| heat.iter().map(range).collect()),
        both: window.both.as_ref().map(range),
        trusted: window.trusted,
        perfect_contact_fails: window.plates_fail,
        force_ratio: window.force_ratio,
        larger_thread: window.larger_thread.clone(),
        trials: window.trials.iter().map(trial).collect(),
    }
}

fn trial(trial: &Trial) -> TrialTold {
    let (judged, why) = match &trial.judged {
        Judged::AsSwept => ("as swept", None),
        Judged::Fast => ("solved anew, fast", None),
        Judged::Refused(why) => ("not possible", Some(why.clone())),
    };
    TrialTold {
        change: trial.change.clone(),
        window: trial.window.as_ref().map(range),
        judged,
        why,
    }
}

/// Limits of the torque, N m.
pub(super) fn limits(limits: &[TorqueLimit]) -> Vec<LimitTold> {
    let limits = limits.iter().map(|limit| LimitTold {
        name: limit.name,
        torque: limit.torque,
        side: match limit.side {
            Side::Least => "least",
            Side::Most => "most",
        },
    });
    limits.collect()
}

fn range(range: &Range) -> RangeTold {
    let end = |end: End| EndTold {
        torque: end.torque,
        by: end.by,
    };
    RangeTold {
        low: end(range.low),
        high: end(range.high),
    }
}

/// A load along a bolt in one case: forces in N; `separation` is null where nothing parts the faces.
pub(super) fn axial(shared: &Shared) -> AxialTold {
    AxialTold {
        load: shared.load.into(),
        load_factor: shared.load_factor.into(),
        bolt_force: shared.bolt_force,
        residual: shared.residual.into(),
        separation: shared.separation,
    }
}
