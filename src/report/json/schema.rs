//! The schema of the JSON, derived from the types that are printed.

use schemars::{JsonSchema, Schema, SchemaGenerator, generate::SchemaSettings, transform};
use serde_json::{Value, json};

use crate::report::{
    arrange::ArrangeResult,
    codes::{CodeTold, CodesTold},
    drivers::DriversResult,
    fit::{SeriesResult, UnknownResult},
    json::{CompareResult, EstimateResult, TorqueResult},
    listing::{Checked, Listed, Unanswered},
};

/// Commands whose JSON has a schema.
pub const COMMANDS: [&str; 9] = [
    "estimate", "torque", "compare", "drivers", "arrange", "fit", "check", "list", "explain",
];

/// The schema of what a command prints with `--json`; without a command that of all.
///
/// JSON Schema, draft 2020-12. Every object is closed, and every key is required but those whose
/// description says when they are there. A file at fault and a joint without an answer are among what
/// a command prints.
pub fn schema(command: Option<&str>) -> Value {
    let mut generator = SchemaSettings::draft2020_12()
        .for_serialize()
        .with_transform(transform::RecursiveTransform(close))
        .into_generator();
    let asked: Vec<&str> = COMMANDS
        .into_iter()
        .filter(|each| command.is_none_or(|command| command == *each))
        .collect();
    let mut forms: Vec<Value> = Vec::new();
    for form in asked
        .iter()
        .flat_map(|command| printed(command, &mut generator))
    {
        if !forms.contains(&form) {
            forms.push(form);
        }
    }
    let title = command.map_or("what ringsum prints with --json".to_owned(), |command| {
        format!("what ringsum {command} prints with --json")
    });
    json!({
        "$schema": "https://json-schema.org/draft/2020-12/schema",
        "title": title,
        "description": "Of several files one object on every line. A number that is not finite is null.",
        "oneOf": forms,
        "$defs": generator.take_definitions(true),
    })
}

/// References to the forms of what a command prints.
fn printed(command: &str, generator: &mut SchemaGenerator) -> Vec<Value> {
    match command {
        "explain" => return vec![of::<CodeTold>(generator), of::<CodesTold>(generator)],
        "list" => return vec![of::<Listed>(generator)],
        _ => {}
    }
    let mut forms = match command {
        "estimate" => vec![of::<EstimateResult>(generator)],
        "torque" => vec![of::<TorqueResult>(generator)],
        "compare" => vec![of::<CompareResult>(generator)],
        "drivers" => vec![of::<DriversResult>(generator)],
        "arrange" => vec![of::<ArrangeResult>(generator)],
        "fit" => vec![
            of::<SeriesResult>(generator),
            of::<UnknownResult>(generator),
        ],
        _ => Vec::new(),
    };
    forms.push(of::<Checked>(generator));
    if ["estimate", "torque", "compare", "drivers", "arrange", "fit"].contains(&command) {
        forms.push(of::<Unanswered>(generator));
    }
    forms
}

fn of<T: JsonSchema>(generator: &mut SchemaGenerator) -> Value {
    generator.subschema_for::<T>().to_value()
}

/// No key but those that are named.
fn close(schema: &mut Schema) {
    if schema.get("properties").is_some() {
        schema.insert("additionalProperties".to_owned(), json!(false));
    }
}
