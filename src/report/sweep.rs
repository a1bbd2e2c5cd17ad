//! Resistance against torque, for the terminal.

use crate::{
    estimate::{BestBy, Minimum, TorquePoint, TorqueSweep},
    joint::Limit,
    report::{
        number::{band, four, percent, plain},
        table::{Side, aligned},
        text::{Detail, cautions, told_in},
        window,
    },
    units::{Shown, System},
};
use std::fmt::Write;

/// Share by which the nominal resistance must rise past the best torque to be called worse: less
/// is within what the fields themselves leave open.
const WORSE: f64 = 0.005;

/// Torques that differ by less are one, as a share.
const SAME_TORQUE: f64 = 1e-6;

/// Where more torque makes the joint worse although strength allows it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Worse {
    /// The thermally best torque, N m.
    pub beyond: f64,
    /// Torque of the largest resistance past the best one that strength allows, N m.
    pub at: f64,
    /// How far source to sink lies above the lowest there, as a share of the lowest.
    pub rise: f64,
}

/// The rise of source to sink past the best torque; none where more torque never costs much.
///
/// In gas or thin paste the gap between the bolts grows with the force, so that the curve may have
/// its lowest point inside the window. A joint that must resist is never worse for resisting more.
pub fn worse(sweep: &TorqueSweep) -> Option<Worse> {
    if sweep.resists() {
        return None;
    }
    let beyond = sweep.best?;
    let nominal = |point: &TorquePoint| point.source_to_sink.nominal;
    let lowest = match between_rows(sweep) {
        Some(best) => best.source_to_sink,
        None => nominal(sweep.points.iter().find(|point| point.torque >= beyond)?),
    };
    let worst = sweep
        .points
        .iter()
        .filter(|point| point.passes && point.torque > beyond)
        .max_by(|one, other| nominal(one).total_cmp(&nominal(other)))?;
    let rise = nominal(worst) / lowest - 1.0;
    (rise > WORSE).then_some(Worse {
        beyond,
        at: worst.torque,
        rise,
    })
}

/// The sweep as a table with the stated, the best and the largest torque marked.
pub fn torque(sweep: &TorqueSweep) -> String {
    torque_in(sweep, System::Si)
}

/// The sweep in a system of units.
pub fn torque_in(sweep: &TorqueSweep, units: System) -> String {
    let [lever, force] = [Shown::Torque, Shown::Force].map(|shown| units.unit(shown));
    let stated = nearest(sweep, sweep.stated);
    let best = best_row(sweep);
    let rows: Vec<Vec<String>> = sweep
        .points
        .iter()
        .enumerate()
        .map(|(index, point)| {
            let mut marks = Vec::new();
            if Some(index) == stated {
                marks.push("stated");
            }
            if Some(index) == best {
                marks.push(if between_rows(sweep).is_some() {
                    "near best"
                } else {
                    "best"
                });
            }
            if !point.passes {
                marks.push("over");
            }
            row(point, &marks.join(" "), [lever.size, force.size])
        })
        .collect();
    let right = Side::Right;
    let torque = format!("torque\n{}", lever.name);
    let forces = format!("force {}\nnominal", force.name);
    let table = aligned(
        &[
            (&torque, right),
            (&forces, right),
            ("sink K/W\nlow", right),
            ("sink K/W\nnominal", right),
            ("sink K/W\nhigh", right),
            ("added K/W\nnominal", right),
            ("contact K/W\nnominal", right),
            ("of yield\nhighest", right),
            ("", Side::Left),
        ],
        &rows,
    );
    let torques: Vec<f64> = sweep
        .points
        .iter()
        .map(|point| point.torque / lever.size)
        .collect();
    let mut marks = window::marks(sweep);
    for mark in &mut marks {
        mark.torque /= lever.size;
    }
    let table = window::interleaved(&table, &torques, &marks);
    let title = plain(&sweep.title);
    let mut text = String::new();
    let _ = writeln!(
        text,
        "torque of {}; the other fasteners as stated; {} case\n\
         field {}, {}\n\
         sink: source to sink; added: by the joint; contact: the faces alone, without spreading\n{}\n{table}",
        plain(&sweep.group),
        sweep.case,
        sweep.field,
        sweep.resolution,
        // Without draws there is no low and no high.
        if sweep.bends
            && sweep
                .points
                .iter()
                .any(|point| point.source_to_sink.high.is_some())
        {
            "low and high hold for faces bent convex, flat and concave, since flatness leaves it open\n"
        } else {
            ""
        },
    );
    let _ = writeln!(
        text,
        "stated   {} N·m{}",
        four(sweep.stated),
        if stated.is_some() {
            " (marked)"
        } else {
            ", outside this range"
        }
    );
    if let Some((torque, limit)) = sweep.largest {
        let _ = writeln!(
            text,
            "over     beyond {} N·m, where {limit} ends the window",
            four(torque)
        );
    }
    text.push_str(&advice(sweep, best));
    text.push_str(&window::statement(sweep));
    if let Some((resistance, bound)) = sweep.required {
        let side = match bound {
            Limit::Most => "at most",
            Limit::Least => "at least",
        };
        let _ = writeln!(
            text,
            "required {side} {} K/W source to sink",
            four(resistance)
        );
    }
    let told = cautions(&sweep.cautions, Detail::Screen);
    if !told.is_empty() {
        text.push('\n');
        text.push_str(&told);
    }
    format!("{title}\n{}", told_in(&text, units))
}

/// The best torque where it is no row: the minimum between two, or the limit of strength.
fn between_rows(sweep: &TorqueSweep) -> Option<Minimum> {
    sweep.held_minimum().or(sweep.at_limit)
}

/// The row of the best torque, or the one nearest to it where it lies between two.
fn best_row(sweep: &TorqueSweep) -> Option<usize> {
    let best = sweep.best?;
    if between_rows(sweep).is_some() {
        return nearest(sweep, best);
    }
    sweep.points.iter().position(|point| point.torque >= best)
}

/// What the sweep says about the best torque; never one beyond strength.
fn advice(sweep: &TorqueSweep, best: Option<usize>) -> String {
    if best.is_none() && sweep.gap_unknown() {
        return "best     not told: in gas the gap between the bolts grows with the force, so that more torque may \
                be worse, and this field does not know the gap\n"
            .to_owned();
    }
    let (Some(index), Some(torque)) = (best, sweep.best) else {
        return if sweep.window.least().is_some() {
            "best     no torque of this range passes every strength limit and keeps the faces together\n"
        } else {
            "best     no torque of this range passes every strength limit\n"
        }
        .to_owned();
    };
    let there = between_rows(sweep).map_or(sweep.points[index].source_to_sink.nominal, |found| {
        found.source_to_sink
    });
    // No torque is better or worse than itself.
    let gain = if (torque / sweep.stated - 1.0).abs() < SAME_TORQUE {
        ", at the stated torque".to_owned()
    } else {
        let gain = 1.0 - there / sweep.at_stated;
        let side = if gain < 0.0 { "above" } else { "below" };
        format!(", {} {side} the stated torque", percent(gain.abs()))
    };
    let mut text = format!(
        "best     {} N·m: {}{gain}\n",
        four(torque),
        praise(sweep, there)
    );
    for line in remarks(sweep, index) {
        let _ = writeln!(text, "         {line}");
    }
    if let (Some(lower), None) = (sweep.minimum, sweep.held_minimum()) {
        let _ = writeln!(
            text,
            "minimum  {} N·m: {} K/W at nominal, where the least force may let the faces part",
            four(lower.torque),
            four(lower.source_to_sink)
        );
    }
    if let Some(Worse { beyond, at, rise }) = worse(sweep) {
        let _ = writeln!(
            text,
            "worse    more torque makes it worse beyond {} N·m: {} above the lowest at {} N·m",
            four(beyond),
            percent(rise),
            four(at)
        );
    }
    text
}

/// What makes the best torque the best.
fn praise(sweep: &TorqueSweep, there: f64) -> String {
    let extreme = if sweep.resists() { "highest" } else { "lowest" };
    match sweep.best_by() {
        BestBy::Minimum => format!("the minimum of source to sink, {} K/W", four(there)),
        BestBy::Strength => format!("{extreme} source to sink that strength allows here"),
        BestBy::Separation => format!("{extreme} source to sink that separation allows"),
    }
}

/// What must be known of the best torque before it is taken for one.
fn remarks(sweep: &TorqueSweep, index: usize) -> Vec<&'static str> {
    let mut lines = Vec::new();
    if sweep.held_minimum().is_some() {
        lines.push(
            "found between the rows; below it the contact lacks force, beyond it the gap opens",
        );
    } else if sweep.at_limit.is_some() {
        lines.push(if sweep.best_by() == BestBy::Separation {
            "it is the least torque that keeps the faces together; any less may part them"
        } else {
            "it is the limit of strength itself, between two rows"
        });
    } else if index == 0 && sweep.points.len() > 1 {
        lines.push(if sweep.resists() {
            "it is the first torque swept: less resists more, and what the bolts must hold decides"
        } else {
            "it is the first torque swept: the minimum may lie below it; --from starts lower"
        });
    } else if sweep.resists() {
        lines.push("the requirement asks for at least so much resistance: more is better");
    }
    lines
}

fn row(point: &TorquePoint, marks: &str, [lever, force]: [f64; 2]) -> Vec<String> {
    let mut row = vec![
        four(point.torque / lever),
        four(point.force.nominal / force),
    ];
    row.extend(band(&point.source_to_sink, 1.0));
    row.push(four(point.added_by_joint.nominal));
    row.push(four(point.contact.nominal));
    row.push(
        point
            .strength_use
            .map_or_else(|| "–".to_owned(), |each| percent(each[1])),
    );
    row.push(marks.to_owned());
    row
}

fn nearest(sweep: &TorqueSweep, torque: f64) -> Option<usize> {
    let first = sweep.points.first()?.torque;
    let last = sweep.points.last()?.torque;
    if !(first..=last).contains(&torque) {
        return None;
    }
    let distance = |index: &usize| (sweep.points[*index].torque - torque).abs();
    (0..sweep.points.len()).min_by(|one, other| distance(one).total_cmp(&distance(other)))
}
