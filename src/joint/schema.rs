//! The JSON Schema (draft-07) of the joint file, from the description of its fields.

use serde_json::{Map, Value, json};

use crate::{
    joint::{
        fields::{Catalogue, Field, Kind, Measure, Need, SPREAD_KEYS, Section},
        sections::FILE,
    },
    units::Quantity,
};

/// The schema of the joint file.
pub fn schema() -> Value {
    let mut schema = table(&FILE);
    if let Value::Object(entries) = &mut schema {
        entries.insert(
            "$schema".into(),
            json!("http://json-schema.org/draft-07/schema#"),
        );
        entries.insert("title".into(), json!("ringsum joint file"));
    }
    schema
}

fn table(section: &Section) -> Value {
    let properties: Map<String, Value> = section
        .fields
        .iter()
        .map(|field| (field.key.to_owned(), property(field)))
        .collect();
    let required: Vec<&str> = section
        .fields
        .iter()
        .filter(|field| field.need == Need::Required)
        .map(|field| field.key)
        .collect();
    let mut schema = json!({
        "type": "object",
        "description": section.meaning,
        "properties": properties,
        "additionalProperties": false,
    });
    if !required.is_empty() {
        schema["required"] = json!(required);
    }
    schema
}

fn property(field: &Field) -> Value {
    let mut schema = kind(field.kind, field);
    let mut description = field.meaning.to_owned();
    if !field.default.is_empty() {
        description = format!("{description} (default: {})", field.default);
    }
    schema["description"] = json!(description);
    if let Ok(example) = toml::from_str::<toml::Table>(&field.line())
        && let Some(example) = example.get(field.key)
        && let Ok(example) = serde_json::to_value(example)
    {
        schema["examples"] = json!([example]);
    }
    schema
}

fn kind(kind: Kind, field: &Field) -> Value {
    match kind {
        Kind::Text => json!({ "type": "string" }),
        Kind::Name(catalogue) => name(catalogue),
        Kind::Flag => json!({ "type": "boolean" }),
        Kind::Number => measure(Measure::Number, field),
        Kind::Choice(words) => json!({ "enum": words }),
        Kind::Quantity(of) => quantity(of),
        Kind::QuantityOr(of, words) => any([quantity(of), json!({ "enum": words })]),
        Kind::Spread(of) => spread(&measure(of, field)),
        Kind::SpreadOr(catalogue) => {
            any([spread(&measure(Measure::Number, field)), name(catalogue)])
        }
        Kind::PerPlate(of) => {
            let one = measure(of, field);
            any([
                one.clone(),
                list(&one, [2, 2]),
                json!({ "type": "object", "additionalProperties": one }),
            ])
        }
        Kind::Point => point(),
        Kind::Points => json!({ "type": "array", "items": point(), "minItems": 1 }),
        Kind::Pairs([first, second]) => json!({
            "type": "array",
            "minItems": 1,
            "items": {
                "type": "array",
                "items": [quantity(first), quantity(second)],
                "minItems": 2,
                "maxItems": 2,
            },
        }),
        Kind::Count => {
            let one = json!({ "type": "integer", "minimum": 1 });
            any([one.clone(), list(&one, [1, 2])])
        }
        Kind::Table(section) => {
            let whole = table(section);
            match section.shorthand.and_then(|key| section.field(key)) {
                Some(short) => any([self::kind(short.kind, short), whole]),
                None => whole,
            }
        }
        Kind::List(section) => {
            let one = table(section);
            any([json!({ "type": "array", "items": one }), one])
        }
    }
}

fn any<const N: usize>(of: [Value; N]) -> Value {
    json!({ "anyOf": Vec::from(of) })
}

fn list(item: &Value, [least, most]: [usize; 2]) -> Value {
    json!({ "type": "array", "items": item, "minItems": least, "maxItems": most })
}

fn point() -> Value {
    list(&quantity(Quantity::Length), [2, 2])
}

fn spread(one: &Value) -> Value {
    let parts: Map<String, Value> = SPREAD_KEYS
        .iter()
        .map(|key| ((*key).to_owned(), one.clone()))
        .collect();
    any([
        one.clone(),
        list(one, [2, 3]),
        json!({ "type": "object", "properties": parts, "additionalProperties": false }),
    ])
}

fn measure(measure: Measure, field: &Field) -> Value {
    match measure {
        Measure::Quantity(of) => quantity(of),
        Measure::Roughness => json!({
            "type": "string",
            "pattern": "[0-9]",
            "description": Measure::Roughness.expects(),
        }),
        Measure::Number => {
            let mut number = json!({ "type": "number" });
            for (key, limit) in ["minimum", "maximum"].iter().zip(field.range) {
                if limit.is_finite() {
                    number[*key] = json!(limit);
                }
            }
            number
        }
    }
}

/// Text with a number first and a unit after it; the reader knows the units.
fn quantity(of: Quantity) -> Value {
    json!({
        "type": "string",
        "pattern": "^\\s*[+\\-−]?[0-9.][0-9.eE+\\-−_]*\\s*[^0-9.\\s].*$",
        "description": format!("{} with its unit, such as {}", of.with_article(), of.example()),
    })
}

/// A name: free text, since the catalogue also answers to aliases, and materials may be your own.
fn name(catalogue: Catalogue) -> Value {
    json!({ "type": "string", "minLength": 1, "description": catalogue.expects() })
}
