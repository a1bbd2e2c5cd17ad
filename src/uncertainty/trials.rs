//! What would open a shut torque window: changes of the bolt, each tried alone.

use crate::{
    catalog,
    estimate::{Chain, Choice, End, Failure, Fineness, Judged, Range, Trial, Watch},
    joint::{Bounds, Fastener, Friction, Joint, Tightening, TorqueTightening},
    uncertainty::window::{FIRST, LAST, Sought, allowed},
};

/// Memory that the solved field of a changed joint may take, bytes: far more than `fast` needs.
const MEMORY: u64 = 1_000_000_000;
/// Torques at which a changed joint is looked at before its window is sought.
const LOOKS: usize = 3;

/// A like joint that may open a shut window.
#[derive(Clone, Debug, PartialEq)]
pub struct Alternative {
    /// What is changed.
    pub change: String,
    /// The joint; why there is none otherwise.
    pub joint: Result<Joint, String>,
}

/// Joints otherwise: larger bolts, more of them, a filler; each solved for itself.
pub(super) fn alternatives(
    sought: &Sought<'_>,
    others: Vec<Alternative>,
) -> Result<Vec<Trial>, Failure> {
    others
        .into_iter()
        .map(|Alternative { change, joint }| {
            let (window, judged) = match joint {
                Err(why) => (None, Judged::Refused(why)),
                Ok(joint) => otherwise(sought, &joint)?,
            };
            Ok(Trial {
                change,
                window,
                judged,
            })
        })
        .collect()
}

/// The window of another joint on the same kind of field, the solved one at its quickest.
fn otherwise(sought: &Sought<'_>, joint: &Joint) -> Result<(Option<Range>, Judged), Failure> {
    let group = sought.options.group;
    let (choice, judged) = if sought.chain.knows_the_gap() {
        (Choice::elastic(Fineness::Fast, MEMORY), Judged::Fast)
    } else {
        (Choice::Cone, Judged::AsSwept)
    };
    let refused = |failure: Failure| Ok((None, Judged::Refused(failure.to_string())));
    let chain = match Chain::of(joint, choice, &Watch::none()) {
        Ok(chain) => chain,
        Err(failure) => return refused(failure),
    };
    let largest = chain
        .largest_torque(group)
        .map_or(0.0, |(torque, _)| torque);
    let changed = Sought {
        chain: &chain,
        // A larger bolt bears torques that the stated one was not swept to.
        range: [sought.range[0], sought.range[1].max(largest)],
        ..*sought
    };
    let Some(room) = room(&changed) else {
        return Ok((None, judged));
    };
    let ends = [room.low.torque.max(changed.range[0]), room.high.torque];
    let looks: Vec<f64> = (0..LOOKS)
        .map(|look| ends[0] + (ends[1] - ends[0]) * look as f64 / (LOOKS - 1) as f64)
        .collect();
    // Where the nominal already misses everywhere, no draw is needed.
    let mut met = false;
    for torque in &looks {
        match changed.nominal_excess_at(*torque) {
            Ok(excess) => met |= excess <= 0.0,
            Err(failure) => return refused(failure),
        }
    }
    if !met {
        return Ok((None, judged));
    }
    if sought.options.chain.draws > 0
        && let Err(failure) = chain.expect_torques((sought.case, group), ends)
    {
        return refused(failure);
    }
    match within(&changed, room, &looks) {
        Ok(found) => Ok((found, judged)),
        Err(failure) => refused(failure),
    }
}

/// Changes of the bolt that leave plates and seats as they are, each tried alone.
pub(super) fn trials(sought: &Sought<'_>, best: Option<f64>) -> Result<Vec<Trial>, Failure> {
    let group = sought.options.group;
    changes(&sought.chain.joint().fasteners[group])
        .into_iter()
        .map(|(change, fastener)| {
            let chain = sought.chain.with_fastener(group, fastener)?;
            let changed = Sought {
                chain: &chain,
                ..*sought
            };
            Ok(Trial {
                change,
                window: opened(&changed, best)?,
                judged: Judged::AsSwept,
            })
        })
        .collect()
}

/// The window of a changed bolt within the torques swept; none where it stays shut.
fn opened(sought: &Sought<'_>, best: Option<f64>) -> Result<Option<Range>, Failure> {
    let Some(room) = room(sought) else {
        return Ok(None);
    };
    let [low, high] = [room.low, room.high].map(|end| end.torque);
    let between = best.filter(|best| low < *best && *best < high);
    let looks: Vec<f64> = [low, high].into_iter().chain(between).collect();
    within(sought, room, &looks)
}

/// What strength allows of the torques swept.
fn room(sought: &Sought<'_>) -> Option<Range> {
    let group = sought.options.group;
    let limits = sought.chain.torque_limits(group);
    let strength = allowed(sought.chain, group, &limits)?;
    let swept = Range {
        low: End {
            torque: sought.range[0],
            by: FIRST,
        },
        high: End {
            torque: sought.range[1],
            by: LAST,
        },
    };
    strength.shared(swept)
}

/// The first range in which the heat is met too, looked for from some torques.
fn within(sought: &Sought<'_>, room: Range, looks: &[f64]) -> Result<Option<Range>, Failure> {
    let known = looks
        .iter()
        .map(|torque| Ok((*torque, sought.excess_at(*torque)?)))
        .collect::<Result<Vec<(f64, f64)>, Failure>>()?;
    let found = sought.heat(known)?;
    // An end that both share carries the name of the room.
    Ok(found.first().and_then(|range| room.shared(*range)))
}

/// Half-width of friction that is measured on the lot.
const MEASURED_FRICTION: f64 = 0.10;
/// Tolerance of a close tool.
const CLOSE_TOOL: f64 = 0.02;
/// Scatter of a bolt tightened by its elongation; NASA practice (seen).
const ELONGATION: f64 = 0.05;

/// Like bolts, each changed in one thing.
fn changes(fastener: &Fastener) -> Vec<(String, Fastener)> {
    let Tightening::Torque(tightening) = &fastener.tightening else {
        return Vec::new();
    };
    let with = |change: &dyn Fn(&mut TorqueTightening)| {
        let mut changed = tightening.clone();
        change(&mut changed);
        Fastener {
            tightening: Tightening::Torque(changed),
            ..fastener.clone()
        }
    };
    let mut found = Vec::new();
    if tightening.scatter.is_none() {
        if let Some(friction) = narrowed(&tightening.friction) {
            found.push((
                "friction known to ± 10 % (lubricant of one class, measured on its lot)".to_owned(),
                with(&|changed| changed.friction = friction),
            ));
        }
        if tightening.tolerance > CLOSE_TOOL {
            found.push((
                "a tool of ± 2 %".to_owned(),
                with(&|changed| changed.tolerance = CLOSE_TOOL),
            ));
        }
    }
    if tightening
        .scatter
        .is_none_or(|scatter| scatter > ELONGATION)
    {
        found.push((
            "tightening by measured elongation (± 5 % of the force)".to_owned(),
            with(&|changed| changed.scatter = Some(ELONGATION)),
        ));
    }
    if let Some(grade) = stronger(fastener) {
        let change = format!("grade {}", grade.name);
        let grade = grade.clone();
        found.push((
            change,
            Fastener {
                grade,
                ..fastener.clone()
            },
        ));
    }
    found
}

/// Friction no wider than measured on its lot; none where it is as narrow.
fn narrowed(friction: &Friction) -> Option<Friction> {
    let close = |bounds: &Bounds| Bounds {
        low: bounds.low.max((1.0 - MEASURED_FRICTION) * bounds.nominal),
        high: bounds.high.min((1.0 + MEASURED_FRICTION) * bounds.nominal),
        ..*bounds
    };
    let close = match friction {
        Friction::Coefficients { thread, head } => Friction::Coefficients {
            thread: close(thread),
            head: close(head),
        },
        Friction::NutFactor(factor) => Friction::NutFactor(close(factor)),
    };
    (close != *friction).then_some(close)
}

/// The weakest grade of the same metal and size that yields later.
fn stronger(fastener: &Fastener) -> Option<&'static catalog::Grade> {
    let strength = fastener.grade.yield_strength.as_ref()?.value;
    let of = |grade: &catalog::Grade| grade.yield_strength.as_ref().map(|each| each.value);
    catalog::grades()
        .iter()
        .filter_map(|grade| catalog::grade(&grade.name, fastener.thread.diameter))
        .filter(|grade| grade.like == fastener.grade.like)
        .filter(|grade| of(grade).is_some_and(|each| each > strength))
        .min_by(|one, other| {
            of(one)
                .unwrap_or(f64::INFINITY)
                .total_cmp(&of(other).unwrap_or(f64::INFINITY))
        })
}
