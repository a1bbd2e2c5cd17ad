//! The JSON Schema (draft-07) of the joint file, from the description of its fields.

use std::collections::BTreeMap;

use serde_json::{Value, json};

use crate::{
    catalog,
    joint::{
        MOST_PLATES,
        fields::{Catalogue, DISTRIBUTIONS, Field, Kind, Measure, Need, SPREAD_KEYS, Section},
        seats::HEADS,
        sections::FILE,
    },
    units::Quantity,
};

/// The schema of the joint file.
pub fn schema() -> Value {
    let mut parts = Parts::default();
    let mut schema = parts.table(&FILE);
    schema["$schema"] = json!("http://json-schema.org/draft-07/schema#");
    schema["title"] = json!("ringsum joint file");
    schema["definitions"] = json!(parts.0);
    schema
}

/// What is described once and referred to: tables, quantities, names.
#[derive(Default)]
struct Parts(BTreeMap<String, Value>);

impl Parts {
    fn table(&mut self, section: &Section) -> Value {
        let mut properties = BTreeMap::new();
        let mut required = Vec::new();
        for field in section.fields {
            properties.insert(field.key, self.property(field));
            if field.need == Need::Required {
                required.push(field.key);
            }
        }
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

    fn property(&mut self, field: &Field) -> Value {
        let mut schema = self.kind(field.kind, field);
        // Beside a reference other keys are not read, so it stands inside a list of one.
        if schema.get("$ref").is_some() {
            schema = json!({ "allOf": [schema] });
        }
        let default = if field.default.is_empty() {
            String::new()
        } else {
            format!(" (default: {})", field.default)
        };
        schema["description"] = json!(format!("{}{default}", field.meaning));
        if let Ok(example) = toml::from_str::<toml::Table>(&field.line())
            && let Some(example) = example.get(field.key)
        {
            schema["examples"] = json!([example]);
        }
        schema
    }

    fn kind(&mut self, kind: Kind, field: &Field) -> Value {
        match kind {
            Kind::Text => json!({ "type": "string", "minLength": 1 }),
            Kind::Name(catalogue) => self.name(catalogue),
            Kind::Flag => json!({ "type": "boolean" }),
            Kind::Number => self.measure(Measure::Number, field),
            Kind::Choice(words) => json!({ "enum": words }),
            Kind::Choices(words) => {
                let one = json!({ "enum": words });
                any(&[
                    one.clone(),
                    json!({ "type": "array", "items": one, "minItems": 1 }),
                ])
            }
            Kind::Quantity(of) => self.quantity(of),
            Kind::QuantityOr(of, words) => any(&[json!({ "enum": words }), self.quantity(of)]),
            Kind::Spread(of) => any(&self.spread(of, field)),
            Kind::SpreadOrWord(of, words) => {
                let mut forms = self.spread(Measure::Quantity(of), field);
                forms.push(json!({ "enum": words }));
                any(&forms)
            }
            Kind::SpreadOr(catalogue) => {
                let mut forms = self.spread(Measure::Number, field);
                forms.push(self.name(catalogue));
                any(&forms)
            }
            Kind::PerPlate(of) => {
                let one = self.measure(of, field);
                any(&[
                    one.clone(),
                    list(&one, [2, MOST_PLATES]),
                    json!({ "type": "object", "additionalProperties": one }),
                ])
            }
            Kind::Names => list(&json!({ "type": "string", "minLength": 1 }), [2, 2]),
            Kind::Point => list(&self.quantity(Quantity::Length), [2, 2]),
            Kind::Points => {
                let point = list(&self.quantity(Quantity::Length), [2, 2]);
                json!({ "type": "array", "items": point, "minItems": 1 })
            }
            Kind::Pairs(quantities) => {
                let pair = quantities.map(|of| self.quantity(of));
                let pair = json!({ "type": "array", "items": pair, "minItems": 2, "maxItems": 2 });
                json!({ "type": "array", "items": pair, "minItems": 1 })
            }
            Kind::Count => {
                let one = json!({ "type": "integer", "minimum": 1 });
                any(&[one.clone(), list(&one, [1, 2])])
            }
            Kind::Table(section) => {
                let whole = self.section(section);
                match section.shorthand.and_then(|key| section.field(key)) {
                    Some(short) => any(&[self.kind(short.kind, short), whole]),
                    None => whole,
                }
            }
            Kind::Variants => json!({
                "type": "array",
                "minItems": 1,
                "items": {
                    "type": "object",
                    "properties": { "name": { "type": "string", "minLength": 1 } },
                    "required": ["name"],
                    "minProperties": 2,
                },
            }),
            Kind::List(section) => {
                let one = self.section(section);
                let mut forms = vec![json!({ "type": "array", "items": one, "minItems": 1 }), one];
                let short = section.shorthand.and_then(|key| section.field(key));
                forms.extend(short.map(|short| self.kind(short.kind, short)));
                any(&forms)
            }
        }
    }

    /// A reference to a table; a material inside a plate is its own, since it may go unnamed.
    fn section(&mut self, section: &Section) -> Value {
        let inline = section.name == "material" && section.shorthand.is_some();
        let owner = if inline { "plate_" } else { "" };
        let table = self.table(section);
        self.part(&format!("{owner}{}_table", section.name), table)
    }

    fn spread(&mut self, of: Measure, field: &Field) -> Vec<Value> {
        let one = self.measure(of, field);
        let sigma = any(&[json!({ "type": "string" }), json!({ "type": "number" })]);
        let parts: BTreeMap<_, _> = SPREAD_KEYS
            .iter()
            .map(|key| match *key {
                "sigma" => (*key, sigma.clone()),
                "distribution" => (*key, json!({ "enum": DISTRIBUTIONS })),
                key => (key, one.clone()),
            })
            .collect();
        let table = json!({ "type": "object", "properties": parts, "additionalProperties": false });
        let mut forms = vec![one.clone(), list(&one, [2, 3]), table];
        if of == Measure::Number {
            // A number with its spread is a text: `0.12 ± 10 %`.
            forms.push(json!({ "type": "string", "pattern": "±|\\+/?-| to " }));
        }
        forms
    }

    fn measure(&mut self, measure: Measure, field: &Field) -> Value {
        match measure {
            Measure::Quantity(of) => self.quantity(of),
            Measure::Roughness => json!({
                "type": "string",
                "pattern": "[0-9]",
                "description": Measure::Roughness.expects(),
            }),
            Measure::Number => {
                let mut number = json!({ "type": "number" });
                for (key, limit) in ["minimum", "maximum"].into_iter().zip(field.range) {
                    if limit.is_finite() {
                        number[key] = json!(limit);
                    }
                }
                number
            }
        }
    }

    /// Text with a number first and a unit after it; the reader knows the units.
    fn quantity(&mut self, of: Quantity) -> Value {
        let example = of.example();
        let quantity = json!({
            "type": "string",
            "pattern": "^\\s*[+\\-−]?[0-9.][0-9.eE+\\-−_]*\\s*[^0-9.\\s].*$",
            "description": format!("{} with its unit", of.with_article()),
            "examples": [example],
        });
        self.part(&format!("{}_text", of.name().replace(' ', "_")), quantity)
    }

    /// A name: those of the catalogue are offered; it also answers to other spellings, and
    /// materials and fillers may be your own.
    fn name(&mut self, catalogue: Catalogue) -> Value {
        let name = format!("{catalogue:?}_name").to_lowercase();
        let names = json!({
            "description": catalogue.expects(),
            "anyOf": [{ "enum": names(catalogue) }, { "type": "string", "minLength": 1 }],
        });
        self.part(&name, names)
    }

    fn part(&mut self, name: &str, part: Value) -> Value {
        self.0.insert(name.to_owned(), part);
        json!({ "$ref": format!("#/definitions/{name}") })
    }
}

fn any(forms: &[Value]) -> Value {
    json!({ "anyOf": forms })
}

fn list(item: &Value, [least, most]: [usize; 2]) -> Value {
    json!({ "type": "array", "items": item, "minItems": least, "maxItems": most })
}

/// First names of a part of the catalogue.
fn names(catalogue: Catalogue) -> Vec<&'static str> {
    fn of<T>(records: &'static [T], name: fn(&'static T) -> &'static str) -> Vec<&'static str> {
        let mut names: Vec<&str> = Vec::new();
        for record in records {
            let name = name(record);
            if !names.contains(&name) {
                names.push(name);
            }
        }
        names
    }
    match catalogue {
        Catalogue::Material => of(catalog::materials(), |record| &record.name),
        Catalogue::Finish => of(catalog::finishes(), |record| &record.name),
        Catalogue::Plating => with("none", of(catalog::platings(), |record| &record.name)),
        Catalogue::Thread => of(catalog::threads(), |record| &record.name),
        Catalogue::Grade => of(catalog::grades(), |record| &record.name),
        Catalogue::Head => HEADS.to_vec(),
        Catalogue::Washer => {
            let washers = catalog::seats().iter().filter(|seat| seat.kind == "washer");
            let mut standards: Vec<&str> = washers.map(|seat| seat.standard.as_str()).collect();
            standards.dedup();
            with("none", standards)
        }
        Catalogue::Friction => friction(|record| !record.nut_factor),
        Catalogue::NutFactor => friction(|record| record.nut_factor),
        Catalogue::Method => of(catalog::methods(), |record| &record.name),
        Catalogue::Medium => with("vacuum", of(catalog::gases(), |record| &record.name)),
        Catalogue::Filler => of(catalog::fillers(), |record| &record.name),
    }
}

fn with(first: &'static str, mut names: Vec<&'static str>) -> Vec<&'static str> {
    names.insert(0, first);
    names
}

fn friction(wanted: fn(&catalog::FrictionRecord) -> bool) -> Vec<&'static str> {
    let records = catalog::friction().iter().filter(|record| wanted(record));
    records.map(|record| record.name.as_str()).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn references(value: &Value, found: &mut Vec<String>) {
        match value {
            Value::Object(entries) => {
                if let Some(Value::String(to)) = entries.get("$ref") {
                    found.push(to.clone());
                }
                entries.values().for_each(|value| references(value, found));
            }
            Value::Array(items) => items.iter().for_each(|value| references(value, found)),
            _ => {}
        }
    }

    #[test]
    fn every_reference_leads_to_a_part_of_its_kind() {
        let schema = schema();
        let mut found = Vec::new();
        references(&schema, &mut found);
        assert!(found.len() > 50, "{}", found.len());
        for reference in found {
            let name = reference.trim_start_matches("#/definitions/");
            let part = &schema["definitions"][name];
            let kind = if name.ends_with("_table") {
                "object"
            } else {
                "string"
            };
            let is_kind =
                part["type"] == kind || (name.ends_with("_name") && part["anyOf"].is_array());
            assert!(is_kind, "{name}: {part}");
        }
    }

    #[test]
    fn tables_take_no_unknown_key() {
        let schema = schema();
        assert_eq!(schema["additionalProperties"], json!(false));
        let plate = &schema["definitions"]["plate_table"];
        assert_eq!(plate["additionalProperties"], json!(false));
        assert_eq!(
            plate["required"],
            json!(["material", "thickness", "finish"])
        );
    }
}
