//! Fillers that are layers: by their thickness and conductivity, or by the table measured of them.

use crate::{
    catalog::FillerRecord,
    joint::{
        FillerKind,
        collector::{Collector, Wording, fault},
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

pub(super) fn thickness(
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

/// What a layer is as a bed of springs.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Spring {
    /// Modulus under pressure over the whole face, Pa.
    pub(super) modulus: Option<f64>,
    /// Thickness in the joint, m.
    pub(super) thickness: Option<f64>,
}

/// Reads the modulus of a layer; none when it is faulty or stated of what is no layer.
pub(super) fn spring(
    record: &Record,
    (known, kind): (Option<&FillerRecord>, &FillerKind),
    collector: &mut Collector,
) -> Option<Spring> {
    let thickness = match kind {
        FillerKind::Layer { thickness, .. } | FillerKind::Foil { thickness, .. } => {
            Some(*thickness)
        }
        FillerKind::Table { .. } if !record.has("table") => record
            .number("bond_line")
            .or_else(|| record.number("thickness"))
            .or_else(|| known?.thickness.as_ref().map(|supplied| supplied.value)),
        _ => None,
    };
    if thickness.is_none() {
        if record.has("modulus") {
            collector.report(no_layer(record, kind));
            return None;
        }
        return Some(Spring::default());
    }
    let modulus = match record.number("modulus") {
        None if record.has("modulus") => return None,
        None => {
            let datum = known.and_then(|known| known.modulus.as_ref());
            if let Some(datum) = datum {
                collector.assume(
                    record.at("modulus"),
                    units::show(datum.value, Quantity::Pressure),
                    format!("catalogue value: {}", datum.source),
                );
            }
            datum.map(|datum| datum.value)
        }
        stated => stated,
    };
    Some(Spring { modulus, thickness })
}

/// A modulus of something that is no layer.
fn no_layer(record: &Record, kind: &FillerKind) -> crate::diagnostic::Fault {
    let (what, help) = match kind {
        FillerKind::Table { .. } => (
            "a table of your own",
            "a table tells no thickness; describe a pad that spreads the load by `model = \"layer\"` with \
             `conductivity`, `thickness` and `modulus`",
        ),
        FillerKind::Paste { .. } => (
            "a paste",
            "a paste flows away from the load and does not spread it: leave `modulus` out; a cured layer is \
             `model = \"layer\"` with its `thickness`",
        ),
        _ => (
            "a fluid",
            "a fluid flows away from the load and does not spread it: leave `modulus` out",
        ),
    };
    fault(
        "file/conflict",
        &record.span("modulus"),
        format!("`modulus` is stated of {what}"),
    )
    .expecting("only a layer has a modulus")
    .help(help)
}
