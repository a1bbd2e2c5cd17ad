//! Reads a tree by the description of its fields: structure, types, units, ranges.

mod lists;
mod scalars;
mod spreads;

use std::ops::RangeInclusive;

use crate::{
    diagnostic::{self, Fault},
    joint::{
        MOST_PLACES,
        collector::{Collector, Wording, fault},
        fields::{Field, Kind, Measure, Need, Section, listed},
        record::{Entry, Record, Value},
        sections::{FRICTION, REQUIRE, RISES},
        tree::{Form, Key, Node, Span, short},
    },
};

/// Reads the whole file.
pub(super) fn file(node: &Node, section: &'static Section, collector: &mut Collector) -> Record {
    Walk { collector }
        .record(node, section, "")
        .unwrap_or_else(|| Record::absent("", &node.span))
}

/// The walk down the tree.
struct Walk<'c> {
    collector: &'c mut Collector,
}

/// A field with its value: what every reading of a value needs.
#[derive(Clone, Copy)]
struct Stated<'n> {
    field: &'static Field,
    node: &'n Node,
    path: &'n str,
}

impl<'n> Stated<'n> {
    /// The key as the file states it, which for the shorthand of a table is that of the table.
    fn key(&self) -> &'n str {
        self.path.rsplit('.').next().unwrap_or(self.field.key)
    }
}

impl Walk<'_> {
    fn record(&mut self, node: &Node, section: &'static Section, path: &str) -> Option<Record> {
        let Form::Table(entries) = &node.form else {
            return self.short_record(node, section, path);
        };
        let mut record = Record::absent(path, &node.span);
        for (key, value) in entries {
            // A slip of the key is told, and its value read as what was meant: one fault, not two.
            let field = section.field(&key.name).or_else(|| {
                self.meant(key, value, section)
                    .filter(|meant| node.child(meant.key).is_none())
            });
            let Some(field) = field else { continue };
            let path = record.at(field.key);
            let value_read = self.value(Stated {
                field,
                node: value,
                path: &path,
            });
            record.entries.push(Entry {
                field,
                span: value.span.clone(),
                value: value_read,
            });
        }
        for field in section.fields {
            if field.need == Need::Required && !record.has(field.key) {
                self.collector
                    .report(missing(&record, field.key, &field.line()));
            }
        }
        Some(record)
    }

    /// A plain value in place of a table stands for the table's shorthand key.
    fn short_record(
        &mut self,
        node: &Node,
        section: &'static Section,
        path: &str,
    ) -> Option<Record> {
        if section.name == FRICTION.name
            && let Some(told) = bare_friction(node)
        {
            self.collector.report(told);
            return None;
        }
        let field = section.shorthand.and_then(|key| section.field(key));
        let Some(field) = field else {
            let example = section.fields.first().map_or_else(String::new, Field::line);
            self.collector.report(
                wrong_type(node, &format!("`{}`", section.name), "a table")
                    .help(format!("write it as a table, `{{ {example}, … }}`")),
            );
            return None;
        };
        let mut record = Record::absent(path, &node.span);
        let value = self.value(Stated { field, node, path })?;
        record.entries.push(Entry {
            field,
            span: node.span.clone(),
            value: Some(value),
        });
        Some(record)
    }

    fn value(&mut self, stated: Stated<'_>) -> Option<Value> {
        match stated.field.kind {
            Kind::Text | Kind::Name(_) => self.text(stated).map(Value::Text),
            Kind::Choice(words) => self.choice(stated, words).map(Value::Text),
            Kind::Choices(words) => self.choices(stated, words).map(Value::Words),
            Kind::Flag => self.flag(stated).map(Value::Flag),
            Kind::Number => self.single(stated, Measure::Number).map(Value::Number),
            Kind::Quantity(quantity) => self
                .single(stated, Measure::Quantity(quantity))
                .map(Value::Number),
            Kind::QuantityOr(quantity, words) => match &stated.node.form {
                Form::Text(text) if !text.trim_start().starts_with(starts_a_number) => {
                    self.choice(stated, words).map(Value::Text)
                }
                _ => self
                    .single(stated, Measure::Quantity(quantity))
                    .map(Value::Number),
            },
            Kind::Spread(measure) => self.spread(stated, measure).map(Value::Spread),
            Kind::SpreadOrWord(quantity, words) => match &stated.node.form {
                Form::Text(text) if !text.trim_start().starts_with(starts_a_number) => {
                    self.choice(stated, words).map(Value::Text)
                }
                _ => self
                    .spread(stated, Measure::Quantity(quantity))
                    .map(Value::Spread),
            },
            Kind::SpreadOr(_) => match &stated.node.form {
                Form::Text(text) if !spreads::is_spread(text) => Some(Value::Text(text.clone())),
                _ => self.spread(stated, Measure::Number).map(Value::Spread),
            },
            Kind::PerPlate(measure) => self.per_plate(stated, measure).map(Value::PerPlate),
            Kind::Names => self.names(stated).map(Value::Names),
            Kind::Point => self.point(stated).map(Value::Point),
            Kind::Points => self.points(stated).map(Value::Points),
            Kind::Pairs(quantities) => {
                let [first, second] = quantities;
                self.pairs(
                    stated,
                    [Measure::Quantity(first), Measure::Quantity(second)],
                )
                .map(Value::Pairs)
            }
            Kind::Count => self.counts(stated).map(Value::Count),
            Kind::Table(section) => self
                .record(stated.node, section, stated.path)
                .map(Value::Record),
            Kind::List(section) => self.records(stated, section).map(Value::Records),
            // They are taken out of the file before it is walked.
            Kind::Variants => None,
        }
    }

    /// Tells of a key that the table does not have, and returns the field probably meant. A place
    /// whose rise is limited is no key of its own.
    fn meant(&mut self, key: &Key, value: &Node, section: &Section) -> Option<&'static Field> {
        if section.name != REQUIRE.name || !RISES.contains(&key.name.as_str()) {
            return self.unknown(key, section);
        }
        let limit = match &value.form {
            Form::Text(text) => short(text),
            _ => "5 K".into(),
        };
        self.collector.report(
            fault(
                "file/unknown-key",
                &key.span,
                format!("unknown key `{}`", key.name),
            )
            .expecting("not a key of this table")
            .help(format!(
                "write `{{ rise = \"{limit}\", of = \"{}\" }}`",
                key.name
            )),
        );
        REQUIRE.field("rise")
    }

    /// Tells of an unknown key; returns the field of this table that was probably meant.
    fn unknown(&mut self, key: &Key, section: &Section) -> Option<&'static Field> {
        let told = fault(
            "file/unknown-key",
            &key.span,
            format!("unknown key `{}`", short(&key.name)),
        )
        .expecting("not a key of this table");
        if self.collector.is_full() {
            return None;
        }
        if let Some(place) = home(&key.name, section) {
            self.collector
                .report(told.help(format!("`{}` belongs in {place}", key.name)));
            return None;
        }
        let near = diagnostic::nearest(&key.name, section.keys());
        let help = match &near {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("it takes {}", listed(&section.keys().collect::<Vec<_>>())),
        };
        self.collector.report(told.help(help));
        near.and_then(|near| section.field(&near))
    }

    fn wrong(&mut self, stated: Stated<'_>) {
        self.collector.report(
            wrong_type(
                stated.node,
                &format!("`{}`", stated.key()),
                &stated.field.kind.expects(),
            )
            .help(format!("for example `{}`", stated.field.line())),
        );
    }
}

/// Coefficients that stand in place of the table they belong into.
fn bare_friction(node: &Node) -> Option<Fault> {
    let written = match &node.form {
        Form::Number(text, _) => text.clone(),
        Form::Text(text) if text.trim().parse::<f64>().is_ok() => text.trim().to_owned(),
        Form::List(nodes) => {
            let numbers: Option<Vec<&str>> = nodes
                .iter()
                .map(|node| match &node.form {
                    Form::Number(text, _) => Some(text.as_str()),
                    _ => None,
                })
                .collect();
            format!("[{}]", numbers?.join(", "))
        }
        _ => return None,
    };
    let value = short(&written);
    Some(
        wrong_type(node, "`friction`", "a class, or coefficients by name").help(format!(
            "write `friction = {{ thread = {value}, head = {value} }}`; a nut factor is \
             `friction = {{ nut_factor = {value} }}`"
        )),
    )
}

/// A required key that a table does not state.
pub(super) fn missing(record: &Record, key: &str, line: &str) -> Fault {
    let table = if record.path.is_empty() {
        "the file".to_owned()
    } else {
        format!("`{}`", record.path)
    };
    fault(
        "file/missing-key",
        &record.place,
        format!("{table} has no `{key}`"),
    )
    .expecting(format!("`{key}` is missing"))
    .help(format!("for example `{line}`"))
}

/// More of something than this version reads.
pub(super) fn too_many(what: &str, span: &Span, count: usize) -> Fault {
    more_than(MOST_PLACES, what, span, count)
}

/// More entries than a limit of their own.
pub(super) fn more_than(most: usize, what: &str, span: &Span, count: usize) -> Fault {
    fault(
        "file/too-many",
        span,
        format!("`{what}` has {count} entries"),
    )
    .expecting(format!("at most {most}"))
}

fn wrong_type(node: &Node, what: &str, expected: &str) -> Fault {
    fault(
        "file/wrong-type",
        &node.span,
        format!("{what} is {}", node.shown()),
    )
    .expecting(format!("expected {expected}"))
}

/// The table of the file to which a misplaced key belongs.
fn home(key: &str, section: &Section) -> Option<String> {
    let file = &crate::joint::sections::FILE;
    if file.field(key).is_some() && !section.name.is_empty() {
        return Some("the top of the file".into());
    }
    file.fields.iter().find_map(|field| match field.kind {
        Kind::Table(inner) => inner.field(key).map(|_| format!("[{}]", inner.name)),
        Kind::List(inner) => inner.field(key).map(|_| format!("[[{}]]", inner.name)),
        _ => None,
    })
}

fn starts_a_number(letter: char) -> bool {
    letter.is_ascii_digit() || matches!(letter, '+' | '-' | '−' | '.' | ',')
}

fn range(field: &Field) -> RangeInclusive<f64> {
    field.range[0]..=field.range[1]
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use toml::de::DeTable;

    use super::*;
    use crate::joint::sections::FILE;

    /// Every section of the description, each once.
    fn sections(section: &'static Section, found: &mut Vec<&'static Section>) {
        if found.iter().any(|known| std::ptr::eq(*known, section)) {
            return;
        }
        found.push(section);
        for field in section.fields {
            if let Kind::Table(inner) | Kind::List(inner) = field.kind {
                sections(inner, found);
            }
        }
    }

    fn all() -> Vec<&'static Section> {
        let mut found = Vec::new();
        sections(&FILE, &mut found);
        found
    }

    #[test]
    fn every_example_of_the_description_reads() {
        for section in all() {
            for field in section.fields {
                let text = field.line();
                let table = DeTable::parse(&text).expect("an example is TOML");
                let mut collector = Collector::default();
                file(&Node::file(&table), section, &mut collector);
                let told: Vec<_> = collector
                    .into_parts()
                    .0
                    .into_iter()
                    .filter(|fault| {
                        // The example states one field; what else the table needs is not its matter.
                        fault.code != "file/missing-key" || fault.span.start > 0
                    })
                    .collect();
                assert!(told.is_empty(), "{text}: {told:?}");
            }
        }
    }

    #[test]
    fn keys_of_a_section_are_unique_and_described() {
        for section in all() {
            let keys: BTreeSet<_> = section.keys().collect();
            assert_eq!(keys.len(), section.fields.len(), "{}", section.name);
            for field in section.fields {
                assert!(
                    !field.meaning.is_empty() && !field.example.is_empty(),
                    "{}",
                    field.key
                );
                assert!(field.range[0] < field.range[1], "{}", field.key);
            }
            let short = section.shorthand;
            assert!(
                short.is_none_or(|key| section.field(key).is_some()),
                "{}",
                section.name
            );
        }
    }

    #[test]
    fn quantities_have_a_finite_range() {
        for field in all().iter().flat_map(|section| section.fields) {
            if matches!(
                field.kind,
                Kind::Quantity(_)
                    | Kind::QuantityOr(..)
                    | Kind::SpreadOrWord(..)
                    | Kind::Spread(_)
                    | Kind::Point
                    | Kind::Points
            ) {
                assert!(
                    field.range.iter().all(|limit| limit.is_finite()),
                    "{}",
                    field.key
                );
            }
        }
    }
}
