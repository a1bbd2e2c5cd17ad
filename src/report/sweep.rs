//! Resistance against torque, for the terminal.

use crate::{
    estimate::{TorquePoint, TorqueSweep},
    joint::Limit,
    report::{
        number::{band, four, percent, plain},
        table::{Side, aligned},
        text::{Detail, cautions},
    },
};
use std::fmt::Write;

/// The sweep as a table with the stated, the best and the largest torque marked.
pub fn torque(sweep: &TorqueSweep) -> String {
    let stated = nearest(sweep, sweep.stated);
    let best = sweep
        .best
        .and_then(|best| sweep.points.iter().position(|point| point.torque >= best));
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
                marks.push("best");
            }
            if !point.passes {
                marks.push("over");
            }
            row(point, &marks.join(" "))
        })
        .collect();
    let right = Side::Right;
    let table = aligned(
        &[
            ("torque\nN·m", right),
            ("force kN\nnominal", right),
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
    let mut text = format!("{}\n", plain(&sweep.title));
    let _ = writeln!(
        text,
        "torque of {}; the other fasteners as stated\n\
         sink: source to sink; added: by the joint; contact: the faces alone, without spreading\n\n{table}",
        plain(&sweep.group)
    );
    let _ = writeln!(
        text,
        "stated   {} N·m (the nearest torque is marked)",
        four(sweep.stated)
    );
    if let Some((torque, limit)) = sweep.largest {
        let _ = writeln!(
            text,
            "over     beyond {} N·m, where {limit} ends the window",
            four(torque)
        );
    }
    text.push_str(&advice(sweep, best));
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
    text
}

/// What the sweep says about the best torque; never one beyond strength.
fn advice(sweep: &TorqueSweep, best: Option<usize>) -> String {
    match best {
        None => "best     no torque of this range passes every strength limit\n".to_owned(),
        Some(index) => format!(
            "best     {} N·m: lowest source to sink of the torques that strength allows here\n",
            four(sweep.points[index].torque)
        ),
    }
}

fn row(point: &TorquePoint, marks: &str) -> Vec<String> {
    let mut row = vec![four(point.torque), four(point.force.nominal / 1e3)];
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
    let distance = |index: &usize| (sweep.points[*index].torque - torque).abs();
    (0..sweep.points.len()).min_by(|one, other| distance(one).total_cmp(&distance(other)))
}
