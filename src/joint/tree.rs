//! The joint file as a tree in which every key and every value knows the bytes it stands on.

use std::ops::Range;

use toml::{
    Spanned,
    de::{DeTable, DeValue},
};

/// Bytes of the text.
pub(super) type Span = Range<usize>;

/// A value with its place.
#[derive(Clone, Debug)]
pub(super) struct Node {
    /// The bytes it stands on.
    pub span: Span,
    /// What it is.
    pub form: Form,
}

/// What a value is.
#[derive(Clone, Debug)]
pub(super) enum Form {
    /// Text in quotes.
    Text(String),
    /// A bare number, as written.
    Number(String, f64),
    /// `true` or `false`.
    Flag(bool),
    /// A date, which no field takes.
    Date,
    /// A list in brackets, or repeated tables.
    List(Vec<Node>),
    /// A table, its keys in file order.
    Table(Vec<(Key, Node)>),
}

/// A key with its place.
#[derive(Clone, Debug)]
pub(super) struct Key {
    /// The bytes it stands on.
    pub span: Span,
    /// The key.
    pub name: String,
}

impl Node {
    /// The whole file; `shift` bytes stand before it.
    pub(super) fn file(table: &Spanned<DeTable<'_>>) -> Self {
        Self {
            span: 0..0,
            form: Form::Table(entries(table.get_ref(), 0)),
        }
    }

    /// One value; `shift` bytes stand before the text it was parsed from.
    pub(super) fn value(value: &Spanned<DeValue<'_>>, shift: usize) -> Self {
        let form = match value.get_ref() {
            DeValue::String(text) => Form::Text(text.to_string()),
            DeValue::Integer(number) => Form::Number(
                number.to_string(),
                i128::from_str_radix(number.as_str(), number.radix())
                    .map_or(f64::NAN, |whole| whole as f64),
            ),
            DeValue::Float(number) => Form::Number(
                number.to_string(),
                number.as_str().parse().unwrap_or(f64::NAN),
            ),
            DeValue::Boolean(flag) => Form::Flag(*flag),
            DeValue::Datetime(_) => Form::Date,
            DeValue::Array(list) => {
                Form::List(list.iter().map(|item| Self::value(item, shift)).collect())
            }
            DeValue::Table(table) => Form::Table(entries(table, shift)),
        };
        Self {
            span: shifted(&value.span(), shift),
            form,
        }
    }

    /// What stands here, for a sentence: `the number 5`, `a list`.
    pub(super) fn shown(&self) -> String {
        match &self.form {
            Form::Text(text) => format!("the text `{}`", short(text)),
            Form::Number(text, _) => format!("the bare number `{}`", short(text)),
            Form::Flag(flag) => format!("`{flag}`"),
            Form::Date => "a date".into(),
            Form::List(_) => "a list".into(),
            Form::Table(_) => "a table".into(),
        }
    }

    /// The text under a key, when this is a table that has it.
    pub(super) fn text_of(&self, key: &str) -> Option<&str> {
        match &self.child(key)?.form {
            Form::Text(text) => Some(text),
            _ => None,
        }
    }

    /// The value under a key, when this is a table that has it.
    pub(super) fn child(&self, key: &str) -> Option<&Self> {
        match &self.form {
            Form::Table(entries) => entries
                .iter()
                .find(|(name, _)| name.name == key)
                .map(|(_, node)| node),
            _ => None,
        }
    }
}

/// The first forty characters of a text, so that a message stays a sentence.
pub(super) fn short(text: &str) -> String {
    let mut start: String = text.chars().take(40).collect();
    if start.len() < text.len() {
        start.push('…');
    }
    start.replace(['\n', '\r', '\t'], " ")
}

fn entries(table: &DeTable<'_>, shift: usize) -> Vec<(Key, Node)> {
    let mut entries: Vec<(Key, Node)> = table
        .iter()
        .map(|(key, value)| {
            let name = Key {
                span: shifted(&key.span(), shift),
                name: key.get_ref().to_string(),
            };
            (name, Node::value(value, shift))
        })
        .collect();
    entries.sort_by_key(|(key, _)| key.span.start);
    entries
}

fn shifted(span: &Span, shift: usize) -> Span {
    span.start + shift..span.end + shift
}
