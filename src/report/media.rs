//! The same joint in several media: one table, and what a test in gas says about vacuum.

use crate::{
    joint::Medium,
    report::{
        number::{band, optional, wrapped},
        table::{Side, aligned},
        text::WIDTH,
    },
    uncertainty::InMedium,
    units::{Shown, System},
};
use std::fmt::Write;

/// What the joint adds in vacuum over what it adds in gas below which both read alike.
const ALIKE: f64 = 1.05;

/// What the joint adds in vacuum over what it adds in a medium; none where no vacuum is told.
pub(super) fn vacuum_over(media: &[InMedium], of: &InMedium) -> Option<f64> {
    let vacuum = media.iter().find(|each| each.medium == Medium::Vacuum)?;
    let ratio = vacuum.added_by_joint.nominal / of.added_by_joint.nominal;
    ratio.is_finite().then_some(ratio)
}

/// One row for every medium, and a sentence for every gas beside vacuum; empty without media.
pub fn table(media: &[InMedium], case: &str, units: System) -> String {
    let gas = units.unit(Shown::GasPressure);
    let at = format!("at\n{}", gas.name);
    if media.is_empty() {
        return String::new();
    }
    let rows: Vec<Vec<String>> = media
        .iter()
        .map(|each| {
            let mut row = vec![each.medium.word()];
            row.push(optional(
                each.medium.pressure().map(|pascal| pascal / gas.size),
            ));
            row.extend(band(&each.source_to_sink, 1.0));
            row.extend(band(&each.added_by_joint, 1.0));
            row.push(optional(each.rise.map(|rise| rise.nominal)));
            row
        })
        .collect();
    let right = Side::Right;
    let mut text = aligned(
        &[
            ("medium", Side::Left),
            (&at, right),
            ("sink K/W\nlow", right),
            ("sink K/W\nnominal", right),
            ("sink K/W\nhigh", right),
            ("added K/W\nlow", right),
            ("added K/W\nnominal", right),
            ("added K/W\nhigh", right),
            ("rise K\nnominal", right),
        ],
        &rows,
    );
    let _ = writeln!(
        text,
        "sink: source to sink; added: by the joint; {case} case; the contact is that of every medium"
    );
    for gas in media.iter().filter(|each| each.medium != Medium::Vacuum) {
        if let Some(ratio) = vacuum_over(media, gas) {
            let _ = writeln!(text, "{}", wrapped(&sentence(&gas.medium, ratio), WIDTH, 2));
        }
    }
    text
}

fn sentence(gas: &Medium, ratio: f64) -> String {
    let word = gas.word();
    if ratio >= ALIKE {
        format!(
            "a test in {word} reads {ratio:.1} times better than vacuum: in vacuum the joint adds that much more"
        )
    } else if ratio > 1.0 / ALIKE {
        format!("a test in {word} reads like vacuum: the joint adds the same within 5 %")
    } else {
        format!(
            "a test in {word} reads {:.1} times worse than vacuum: in vacuum the joint adds that much less",
            ratio.recip()
        )
    }
}
