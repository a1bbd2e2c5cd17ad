//! One catalogue record with everything known about it: every value with unit, origin and source.

use crate::{
    report::{
        listing::Item,
        number::{brief, plain, wrapped},
        text::WIDTH,
    },
    units::{self, Quantity},
};
use serde_json::Value;

/// How the value of a key is written.
#[derive(Clone, Copy)]
enum Form {
    /// As it stands.
    Plain,
    /// A number in SI with the unit people use.
    In(Quantity),
    /// A number in SI over a unit of its own.
    Over(f64, &'static str),
    /// Pairs: the second value at the first.
    At(Quantity, Quantity),
}

/// Every key of every record with its label and form, in the order of the card.
const FIELDS: &[(&str, &str, Form)] = &[
    ("name", "name", Form::Plain),
    ("kind", "kind", Form::Plain),
    ("thread", "thread", Form::Plain),
    ("standard", "standard", Form::Plain),
    ("series", "series", Form::Plain),
    ("family", "family", Form::Plain),
    ("model", "model", Form::Plain),
    ("metal", "metal", Form::Plain),
    ("inch", "inch", Form::Plain),
    ("quantity", "quantity", Form::Plain),
    ("describes", "stands for", Form::Plain),
    (
        "temperatures",
        "tables at",
        Form::In(Quantity::TemperatureDifference),
    ),
    (
        "conductivity",
        "conductivity",
        Form::In(Quantity::Conductivity),
    ),
    ("conductivity_fit", "conductivity in the cold", Form::Plain),
    ("form", "form", Form::Plain),
    ("coefficients", "coefficients", Form::Plain),
    (
        "valid",
        "from, to",
        Form::In(Quantity::TemperatureDifference),
    ),
    (
        "mean_free_path",
        "mean free path at 1 atm",
        Form::In(Quantity::Length),
    ),
    ("prandtl", "Prandtl number", Form::Plain),
    ("heat_ratio", "ratio of specific heats", Form::Plain),
    ("accommodation", "accommodation", Form::Plain),
    (
        "youngs_modulus",
        "Young's modulus",
        Form::In(Quantity::Pressure),
    ),
    ("poisson", "Poisson's ratio", Form::Plain),
    ("expansion", "expansion", Form::In(Quantity::Expansion)),
    (
        "contraction",
        "contraction from 293 K",
        Form::At(Quantity::TemperatureDifference, Quantity::Ratio),
    ),
    ("hardness", "Meyer hardness", Form::In(Quantity::Pressure)),
    ("microhardness", "microhardness c₁ Pa, c₂", Form::Plain),
    (
        "yield_strength",
        "yield strength",
        Form::In(Quantity::Pressure),
    ),
    (
        "bearing_limit",
        "limit under a head",
        Form::In(Quantity::Pressure),
    ),
    (
        "diameters",
        "diameters from, to",
        Form::In(Quantity::Length),
    ),
    ("tensile", "tensile strength", Form::In(Quantity::Pressure)),
    ("proof", "proof stress", Form::In(Quantity::Pressure)),
    ("density", "density", Form::In(Quantity::Density)),
    ("like", "in the cold like", Form::Plain),
    (
        "roughness_average",
        "roughness Ra",
        Form::In(Quantity::Length),
    ),
    (
        "flatness_per_100mm",
        "flatness",
        Form::Over(1e-6, "µm per 100 mm"),
    ),
    ("thickness", "thickness", Form::In(Quantity::Length)),
    ("thinnest", "thinnest", Form::In(Quantity::Length)),
    (
        "typical_thickness",
        "typical thickness",
        Form::In(Quantity::Length),
    ),
    ("yield_stress", "yield stress", Form::In(Quantity::Pressure)),
    (
        "points",
        "resistance",
        Form::At(Quantity::Pressure, Quantity::AreaResistance),
    ),
    (
        "modulus",
        "modulus under pressure",
        Form::In(Quantity::Pressure),
    ),
    ("creeps", "creeps", Form::Plain),
    ("silicone", "silicone", Form::Plain),
    ("insulates", "insulates", Form::Plain),
    ("diameter", "diameter", Form::In(Quantity::Length)),
    ("pitch", "pitch", Form::In(Quantity::Length)),
    (
        "pitch_diameter",
        "pitch diameter",
        Form::In(Quantity::Length),
    ),
    (
        "minor_diameter",
        "minor diameter of the bolt",
        Form::In(Quantity::Length),
    ),
    (
        "nut_minor_diameter",
        "minor diameter of the nut",
        Form::In(Quantity::Length),
    ),
    (
        "stress_diameter",
        "stress diameter",
        Form::In(Quantity::Length),
    ),
    ("stress_area", "stress area", Form::In(Quantity::Area)),
    ("outer", "outer diameter", Form::In(Quantity::Length)),
    ("inner", "inner diameter", Form::In(Quantity::Length)),
    ("height", "height", Form::In(Quantity::Length)),
    ("fine", "fine", Form::In(Quantity::Length)),
    ("medium", "medium", Form::In(Quantity::Length)),
    ("coarse", "coarse", Form::In(Quantity::Length)),
    ("low", "low", Form::Plain),
    ("nominal", "nominal", Form::Plain),
    ("high", "high", Form::Plain),
    (
        "scatter",
        "scatter ±, least and most",
        Form::In(Quantity::Ratio),
    ),
    ("aliases", "also", Form::Plain),
    ("note", "remark", Form::Plain),
    ("status", "status", Form::Plain),
    ("source", "source", Form::Plain),
];

/// Everything known about a record: each value's label with its lines, the last of which tells the
/// origin of the value where the record has one for each.
pub(super) fn facts(item: &Item) -> Vec<(&'static str, Vec<String>)> {
    FIELDS
        .iter()
        .filter_map(|(key, label, form)| {
            let lines = lines(item.record.get(key)?, *form);
            (!lines.is_empty()).then_some((*label, lines))
        })
        .collect()
}

/// Everything known about a record, a line to each value it has.
pub fn card(item: &Item) -> String {
    let rows = facts(item);
    let width = |label: &str| label.chars().count();
    let margin = 2 + rows
        .iter()
        .map(|(label, _)| width(label))
        .max()
        .unwrap_or(0);
    let indent = " ".repeat(margin);
    let mut text = String::new();
    for (label, lines) in rows {
        text.push_str(label);
        text.push_str(&indent[width(label)..]);
        let wrapped: Vec<String> = lines
            .iter()
            .map(|line| wrapped(&plain(line), WIDTH - margin, 0))
            .collect();
        text.push_str(&wrapped.join("\n").replace('\n', &format!("\n{indent}")));
        text.push('\n');
    }
    text
}

/// The lines of a value; none where nothing is known.
fn lines(value: &Value, form: Form) -> Vec<String> {
    match value {
        Value::Object(parts) if parts.contains_key("value") => {
            let mut told = words(&parts["value"], form);
            if let Some(Value::Array(ends)) = parts.get("range") {
                let ends: Vec<String> = ends.iter().map(|end| words(end, form)).collect();
                told.extend([" (", &ends.join(" to "), ")"]);
            }
            let of = |key: &str| {
                parts
                    .get(key)
                    .map_or_else(String::new, |of| words(of, form))
            };
            vec![told, format!("{}: {}", of("status"), of("source"))]
        }
        Value::Object(parts) => FIELDS
            .iter()
            .filter_map(|(key, label, form)| {
                let told = words(parts.get(*key)?, *form);
                Some(format!("{label}: {told}"))
            })
            .collect(),
        _ => {
            let told = words(value, form);
            if told.is_empty() {
                Vec::new()
            } else {
                vec![told]
            }
        }
    }
}

fn words(value: &Value, form: Form) -> String {
    match (value, form) {
        (Value::Null | Value::Object(_), _) => String::new(),
        (Value::Bool(answer), _) => if *answer { "yes" } else { "no" }.to_owned(),
        (Value::String(text), _) => text.clone(),
        (Value::Number(number), _) => {
            let number = number.as_f64().unwrap_or(f64::NAN);
            match form {
                Form::Plain | Form::At(..) => brief(number),
                Form::In(quantity) => units::show(number, quantity),
                Form::Over(unit, name) => format!("{} {name}", brief(number / unit)),
            }
        }
        (Value::Array(pair), Form::At(at, of)) if pair.iter().all(Value::is_number) => {
            match pair.as_slice() {
                [place, value] => format!(
                    "{} at {}",
                    words(value, Form::In(of)),
                    words(place, Form::In(at))
                ),
                _ => String::new(),
            }
        }
        (Value::Array(list), _) => {
            let all: Vec<String> = list.iter().map(|each| words(each, form)).collect();
            all.join("; ")
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::catalogue;

    #[test]
    fn every_key_of_every_record_has_a_label() {
        for listing in catalogue::listings() {
            for item in &listing.items {
                for key in item.record.as_object().unwrap().keys() {
                    let known = FIELDS.iter().any(|(known, _, _)| known == key);
                    assert!(known, "{}: {key}", listing.kind);
                }
            }
        }
    }

    #[test]
    fn every_card_tells_an_origin_within_the_width() {
        for listing in catalogue::listings() {
            for item in &listing.items {
                let card = card(item);
                let told = ["seen", "memory", "computed", "judgement"]
                    .iter()
                    .any(|status| card.contains(status));
                assert!(told, "{}:\n{card}", listing.kind);
                for line in card.lines() {
                    // A word longer than a line stands alone, uncut.
                    assert!(line.chars().count() <= WIDTH, "{line}");
                }
            }
        }
    }
}
