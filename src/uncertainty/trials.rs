//! What would open a shut torque window: changes of the bolt, each tried alone.

use crate::{
    catalog,
    estimate::{End, Failure, Range, Trial},
    joint::{Bounds, Fastener, Friction, Tightening, TorqueTightening},
    uncertainty::window::{FIRST, LAST, Sought, allowed},
};

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
            })
        })
        .collect()
}

/// The window of a changed bolt within the torques swept; none where it stays shut.
fn opened(sought: &Sought<'_>, best: Option<f64>) -> Result<Option<Range>, Failure> {
    let group = sought.options.group;
    let limits = sought.chain.torque_limits(group);
    let Some(strength) = allowed(sought.chain, group, &limits) else {
        return Ok(None);
    };
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
    let Some(room) = strength.shared(swept) else {
        return Ok(None);
    };
    let [low, high] = [room.low, room.high].map(|end| end.torque);
    let between = best.filter(|best| low < *best && *best < high);
    let mut known = Vec::new();
    for torque in [low, high].into_iter().chain(between) {
        known.push((torque, sought.excess_at(torque)?));
    }
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
