//! What follows from the results: the torque window, drivers, variants side by side, cautions.

use crate::{
    diagnostic::{
        Caution,
        registry::{self, Gravity},
    },
    estimate::{BestBy, Driver, TorqueSweep},
    report::{
        comparison::strength,
        drivers::{not_told_apart, share},
        number::{band, four, optional, percent},
        page::{
            results::sentence,
            table::{Table, numbers, words},
        },
        window,
    },
    uncertainty::{Comparison, Ranking},
};

/// The torque window.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Torque {
    /// Every torque.
    pub(super) table: Table,
    /// Index of the row nearest to the stated torque.
    pub(super) stated: usize,
    /// Index of the last row.
    pub(super) last: usize,
    /// The window in words.
    pub(super) told: Vec<String>,
    /// Limits of strength and separation.
    pub(super) limits: Table,
    /// On which field it stands.
    pub(super) field: String,
}

pub(super) fn torque(sweep: &TorqueSweep) -> Torque {
    // Columns of dashes would tell nothing.
    let drawn = sweep
        .points
        .iter()
        .any(|point| point.source_to_sink.low.is_some());
    let mut columns = vec![
        numbers("torque", "N·m"),
        numbers("clamp force", "kN"),
        numbers("source to sink", "K/W"),
    ];
    if drawn {
        columns.extend([numbers("low", "K/W"), numbers("high", "K/W")]);
    }
    columns.extend([
        numbers("added by joint", "K/W"),
        numbers("contact only", "K/W"),
        numbers("highest use", "of yield"),
        words("strength"),
    ]);
    let mut table = Table::new(
        "torques",
        format!(
            "Resistance against the torque of {}, {} case",
            sweep.group, sweep.case
        ),
        columns,
    );
    for point in &sweep.points {
        let mut cells = vec![four(point.torque), four(point.force.nominal / 1e3)];
        let [low, nominal, high] = band(&point.source_to_sink, 1.0);
        cells.push(nominal);
        if drawn {
            cells.extend([low, high]);
        }
        cells.push(four(point.added_by_joint.nominal));
        cells.push(four(point.contact.nominal));
        cells.push(
            point
                .strength_use
                .map_or_else(|| "–".to_owned(), |each| percent(each[1])),
        );
        cells.push(if point.passes { "holds" } else { "over" }.to_owned());
        table.styled(cells, if point.passes { "" } else { "over" });
    }
    let apart = |index: &usize| (sweep.points[*index].torque - sweep.stated).abs();
    let stated = (0..sweep.points.len()).min_by(|one, other| apart(one).total_cmp(&apart(other)));
    let mut limits = Table::new(
        "",
        "Limits of the torque",
        vec![words("limit"), numbers("torque", "N·m"), words("side")],
    );
    for limit in &sweep.window.limits {
        limits.row(vec![
            limit.name.to_owned(),
            four(limit.torque),
            match limit.side {
                crate::estimate::Side::Least => "at least",
                crate::estimate::Side::Most => "at most",
            }
            .to_owned(),
        ]);
    }
    let mut told: Vec<String> = window::lines(sweep)
        .iter()
        .enumerate()
        .map(|(index, line)| match index {
            0 => format!("Window: {line}."),
            _ => sentence(line),
        })
        .collect();
    if let Some(best) = sweep.best {
        let why = match sweep.best_by() {
            BestBy::Minimum => ", the minimum of the curve",
            BestBy::Strength => " that strength allows",
            BestBy::Separation => " that keeps the faces together (any less may part them)",
        };
        told.push(format!("Thermally best torque{why}: {} N·m.", four(best)));
    }
    Torque {
        stated: stated.unwrap_or(0),
        last: sweep.points.len().saturating_sub(1),
        table,
        told,
        limits,
        field: format!("field {}, {}", sweep.field, sweep.resolution),
    }
}

/// Shares of the inputs in the spread of source to sink, with what to do; the ranking where there is
/// one, else the shares of the estimate.
pub(super) fn drivers(ranking: Option<&Ranking>, drivers: &[Driver]) -> Table {
    const WORTH_A_ROW: f64 = 0.005;
    if let Some(ranking) = ranking {
        let mut table = Table::new(
            "",
            format!(
                "Inputs by their share in the variance of {}, {} case, ± its 95 % interval; if known: the band if the input were known to be nominal; {} of the variance belongs to no input alone{}",
                ranking.target.name(),
                ranking.case,
                percent(ranking.interaction),
                not_told_apart(ranking).map_or_else(String::new, |told| format!("; {told}"))
            ),
            vec![
                words("input"),
                numbers("share of its own", "%"),
                numbers("share in total", "%"),
                numbers("low if known", ranking.target.unit()),
                numbers("high if known", ranking.target.unit()),
                words("what to do about it"),
            ],
        );
        for input in &ranking.inputs {
            if input.index.total.value >= WORTH_A_ROW {
                table.row(vec![
                    input.input.to_owned(),
                    share(&input.index.first),
                    share(&input.index.total),
                    optional(input.known.low),
                    optional(input.known.high),
                    input.remedy.clone(),
                ]);
            }
        }
        return table;
    }
    let mut table = Table::new(
        "",
        "Inputs by their share in the variance of source to sink",
        vec![
            words("input"),
            numbers("share", "%"),
            words("what to do about it"),
        ],
    );
    for driver in drivers.iter().filter(|each| each.share >= WORTH_A_ROW) {
        table.row(vec![
            driver.input.to_owned(),
            format!("{:.1}", 100.0 * driver.share),
            driver.remedy.to_owned(),
        ]);
    }
    table
}

/// The joint and its variants.
pub(super) fn comparison(found: &Comparison) -> Table {
    let level = found.joints.first().map_or_else(String::new, |first| {
        format!(
            "; field {}, {}",
            first.estimate.field, first.estimate.resolution
        )
    });
    // Columns of dashes would tell nothing.
    let drawn = found.joints.iter().any(|joint| joint.estimate.draws > 0);
    let mut columns = vec![words("version"), numbers("source to sink", "K/W")];
    if drawn {
        columns.extend([numbers("low", "K/W"), numbers("high", "K/W")]);
    }
    columns.extend([
        numbers("added by joint", "K/W"),
        numbers("contact only", "K/W"),
        numbers("highest use", "of yield"),
        numbers("bolts", ""),
        numbers("mass", "kg"),
        numbers(
            "best is better",
            if drawn { "of 100 draws" } else { "nominal" },
        ),
    ]);
    let mut table = Table::new(
        "",
        format!("The joint and its variants, each in the case it stands worst in{level}"),
        columns,
    );
    for (index, joint) in found.joints.iter().enumerate() {
        let Some(case) = joint.worst() else { continue };
        let mut cells = vec![joint.name.clone()];
        let [low, nominal, high] = band(&case.results.source_to_sink.resistance, 1.0);
        cells.push(nominal);
        if drawn {
            cells.extend([low, high]);
        }
        cells.push(four(case.results.added_by_joint.resistance.nominal));
        cells.push(four(case.results.contact.resistance.nominal));
        cells.push(strength(joint).map_or_else(|| "–".to_owned(), percent));
        cells.push(joint.bolts.to_string());
        cells.push(four(joint.mass.total()));
        cells.push(match (index == found.best, joint.odds) {
            (true, _) => "best".to_owned(),
            (false, Some(odds)) => format!("{:.0}", 100.0 * odds),
            (false, None) => "–".to_owned(),
        });
        table.styled(cells, if index == found.best { "strong" } else { "" });
    }
    table
}

/// A caution with what to do.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Told {
    /// Its code.
    pub(super) code: &'static str,
    /// How much it matters, in a word.
    pub(super) weight: &'static str,
    /// For the style.
    pub(super) class: &'static str,
    /// With its numbers.
    pub(super) text: String,
    /// What to do: pieces of text, each with whether it is something to type.
    pub(super) remedy: Vec<(bool, &'static str)>,
}

/// Every caution, grave ones first.
pub(super) fn cautions(all: &[Caution]) -> Vec<Told> {
    let mut all = all.to_vec();
    registry::sort_by_gravity(&mut all);
    all.into_iter()
        .map(|caution| {
            let (weight, class) = match registry::gravity(caution.code) {
                Gravity::Grave => ("grave", "grave"),
                Gravity::Range => ("outside a range", "range"),
                Gravity::Note => ("worth knowing", "worth"),
                Gravity::Standing => ("always", "standing"),
            };
            Told {
                code: caution.code,
                weight,
                class,
                text: caution.text,
                remedy: registry::entry(caution.code).map_or_else(Vec::new, |entry| {
                    let pieces = entry.remedy.split('`').enumerate();
                    pieces
                        .map(|(index, piece)| (index % 2 == 1, piece))
                        .filter(|(_, piece)| !piece.is_empty())
                        .collect()
                }),
            }
        })
        .collect()
}
