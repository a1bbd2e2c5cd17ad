//! Fillers that are layers: by their thickness and conductivity, or by the table measured of them.

use crate::{
    catalog::FillerRecord,
    joint::{
        FillerKind,
        collector::Collector,
        filler::{conductivity, line},
        plates::two_ways,
        record::Record,
        walk::missing,
    },
    units::{self, Quantity},
};

/// Reads a filler of model `layer`.
pub(super) fn read(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<FillerKind> {
    if record.has("bond_line") && record.has("thickness") {
        collector.report(two_ways(record, ["bond_line", "thickness"]));
        return None;
    }
    if let Some(known) = known
        && !known.points.is_empty()
        && !record.has("boundary")
    {
        return measured_layer(record, known, collector);
    }
    let thickness = thickness(record, known, collector);
    let conductivity = conductivity(record, known, collector);
    let boundary = match record.number("boundary") {
        None if record.has("boundary") => return None,
        None => {
            collector.assume(record.at("boundary"), "0", "not stated");
            0.0
        }
        Some(boundary) => boundary,
    };
    Some(FillerKind::Layer {
        conductivity: conductivity?,
        thickness: thickness?,
        boundary,
    })
}

fn thickness(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<f64> {
    let key = if record.has("bond_line") {
        "bond_line"
    } else {
        "thickness"
    };
    let supplied = known.and_then(|known| known.thickness.as_ref());
    match (record.number(key), supplied) {
        (None, _) if record.has(key) => None,
        (None, Some(supplied)) => {
            collector.assume(
                record.at(key),
                units::show(supplied.value, Quantity::Length),
                "thickness as supplied, uncompressed",
            );
            Some(supplied.value)
        }
        (None, None) => {
            collector.report(missing(record, "thickness", &line("thickness")));
            None
        }
        (thickness, _) => thickness,
    }
}

/// A layer of the catalogue that was measured in joints: its table, whose bulk part follows the
/// thickness and the conductivity that the file states.
///
/// ```text
/// R′(p) = max(R(p) − B₀, 0) + B · min(R(p), B₀)/B₀        B = t/k as stated, B₀ = t₀/k₀ of the record
/// ```
///
/// What a table holds beyond the bulk is contact, which another thickness does not change.
fn measured_layer(
    record: &Record,
    known: &FillerRecord,
    collector: &mut Collector,
) -> Option<FillerKind> {
    let count = format!("{} points of `{}`", known.points.len(), known.name);
    let own = ["bond_line", "thickness", "conductivity"];
    let supplied = known.thickness.as_ref();
    let Some(supplied) = supplied.filter(|_| own.iter().any(|key| record.has(key))) else {
        collector.assume(record.at("table"), count, known.source.clone());
        return Some(FillerKind::Table {
            points: known.points.clone(),
        });
    };
    let thickness = thickness(record, Some(known), collector);
    let conductivity = conductivity(record, Some(known), collector);
    let bulk = supplied.value / known.conductivity.value;
    let scale = thickness? / conductivity? / bulk;
    // Units bring the dust of binary fractions; the same values mean the same table.
    if (scale - 1.0).abs() < 1e-9 {
        collector.assume(record.at("table"), count, known.source.clone());
        return Some(FillerKind::Table {
            points: known.points.clone(),
        });
    }
    collector.assume(
        record.at("table"),
        format!("{count}, bulk part × {scale:.3}"),
        "thickness over conductivity as stated against that of the record; the contact part stays",
    );
    let scaled = |resistance: f64| (resistance - bulk).max(0.0) + scale * resistance.min(bulk);
    let points = known.points.iter().map(|(p, r)| (*p, scaled(*r)));
    Some(FillerKind::Table {
        points: points.collect(),
    })
}
