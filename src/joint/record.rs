//! A table of the joint file after its values have been read: SI, each with its place.

use crate::joint::{Bounds, fields::Field, tree::Span};

/// A table whose values have been read.
#[derive(Clone, Debug)]
pub(super) struct Record {
    /// Its path: `plate.upper`.
    pub path: String,
    /// Its header, or the whole inline table.
    pub place: Span,
    /// What it states.
    pub entries: Vec<Entry>,
}

/// One stated field.
#[derive(Clone, Debug)]
pub(super) struct Entry {
    /// Its description.
    pub field: &'static Field,
    /// The value's place.
    pub span: Span,
    /// The value; none when it is faulty, which has then been told.
    pub value: Option<Value>,
}

/// A value, SI.
#[derive(Clone, Debug)]
pub(super) enum Value {
    /// Text, a name, a choice.
    Text(String),
    /// One or several choices.
    Words(Vec<String>),
    /// `true` or `false`.
    Flag(bool),
    /// A number or a quantity.
    Number(f64),
    /// A value with bounds.
    Spread(Spread),
    /// One value for each plate, by position or by name.
    PerPlate(PerPlate),
    /// Two names, each with its place.
    Names([(String, Span); 2]),
    /// A point, m.
    Point([f64; 2]),
    /// Points with their places.
    Points(Vec<(Point, Span)>),
    /// Pairs with their places.
    Pairs(Vec<(Point, Span)>),
    /// One or two whole numbers.
    Count(Vec<usize>),
    /// A table.
    Record(Record),
    /// Repeated tables.
    Records(Vec<Record>),
}

/// Two numbers.
pub(super) type Point = [f64; 2];

/// A value with bounds, and whether the file gave the bounds.
#[derive(Clone, Copy, Debug)]
pub(super) struct Spread {
    /// The bounds.
    pub bounds: Bounds,
    /// How the file gave it.
    pub width: Width,
}

/// How a spread was given.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Width {
    /// One value.
    Single,
    /// Low and high, with or without nominal.
    Range,
}

/// A value for each plate.
#[derive(Clone, Debug)]
pub(super) enum PerPlate {
    /// The same for all.
    Both(f64),
    /// By position.
    Each(Vec<f64>),
    /// By plate name.
    Named {
        /// That of the plates that are not named.
        others: Option<f64>,
        /// Names with their places.
        named: Vec<(String, Span, f64)>,
    },
}

impl Record {
    /// A record that states nothing, where a table is absent.
    pub(super) fn absent(path: &str, place: &Span) -> Self {
        Self {
            path: path.into(),
            place: place.clone(),
            entries: Vec::new(),
        }
    }

    /// Whether the file states the field, rightly or wrongly.
    pub(super) fn has(&self, key: &str) -> bool {
        self.entry(key).is_some()
    }

    /// Whether the field is stated wrongly, which has then been told.
    pub(super) fn is_faulty(&self, key: &str) -> bool {
        self.entry(key).is_some_and(|entry| entry.value.is_none())
    }

    /// Path of a field: `plate.upper.thickness`.
    pub(super) fn at(&self, key: &str) -> String {
        if self.path.is_empty() {
            key.into()
        } else {
            format!("{}.{key}", self.path)
        }
    }

    /// Place of a field's value, or of the table when it is not stated.
    pub(super) fn span(&self, key: &str) -> Span {
        self.entry(key)
            .map_or_else(|| self.place.clone(), |entry| entry.span.clone())
    }

    /// A number or quantity; of a spread the nominal value.
    pub(super) fn number(&self, key: &str) -> Option<f64> {
        match self.value(key)? {
            Value::Number(number) => Some(*number),
            Value::Spread(spread) => Some(spread.bounds.nominal),
            _ => None,
        }
    }

    /// A text, name or choice.
    pub(super) fn text(&self, key: &str) -> Option<&str> {
        match self.value(key)? {
            Value::Text(text) => Some(text),
            _ => None,
        }
    }

    /// One or several choices.
    pub(super) fn words(&self, key: &str) -> Option<&[String]> {
        match self.value(key)? {
            Value::Words(words) => Some(words),
            _ => None,
        }
    }

    /// A flag.
    pub(super) fn flag(&self, key: &str) -> Option<bool> {
        match self.value(key)? {
            Value::Flag(flag) => Some(*flag),
            _ => None,
        }
    }

    /// A spread.
    pub(super) fn spread(&self, key: &str) -> Option<Spread> {
        match self.value(key)? {
            Value::Spread(spread) => Some(*spread),
            _ => None,
        }
    }

    /// The bounds of a value that is stated with a spread of its own.
    pub(super) fn stated_spread(&self, key: &str) -> Option<Bounds> {
        let spread = self.spread(key)?;
        spread.bounds.is_spread().then_some(spread.bounds)
    }

    /// A value per plate.
    pub(super) fn per_plate(&self, key: &str) -> Option<&PerPlate> {
        match self.value(key)? {
            Value::PerPlate(values) => Some(values),
            _ => None,
        }
    }

    /// Two names.
    pub(super) fn names(&self, key: &str) -> Option<&[(String, Span); 2]> {
        match self.value(key)? {
            Value::Names(names) => Some(names),
            _ => None,
        }
    }

    /// A point.
    pub(super) fn point(&self, key: &str) -> Option<Point> {
        match self.value(key)? {
            Value::Point(point) => Some(*point),
            _ => None,
        }
    }

    /// Points.
    pub(super) fn points(&self, key: &str) -> Option<&[(Point, Span)]> {
        match self.value(key)? {
            Value::Points(points) => Some(points),
            _ => None,
        }
    }

    /// Pairs.
    pub(super) fn pairs(&self, key: &str) -> Option<&[(Point, Span)]> {
        match self.value(key)? {
            Value::Pairs(pairs) => Some(pairs),
            _ => None,
        }
    }

    /// Whole numbers.
    pub(super) fn counts(&self, key: &str) -> Option<&[usize]> {
        match self.value(key)? {
            Value::Count(counts) => Some(counts),
            _ => None,
        }
    }

    /// A table.
    pub(super) fn record(&self, key: &str) -> Option<&Self> {
        match self.value(key)? {
            Value::Record(record) => Some(record),
            _ => None,
        }
    }

    /// Repeated tables; none when there are none.
    pub(super) fn records(&self, key: &str) -> &[Self] {
        match self.value(key) {
            Some(Value::Records(records)) => records,
            _ => &[],
        }
    }

    fn entry(&self, key: &str) -> Option<&Entry> {
        self.entries.iter().find(|entry| entry.field.key == key)
    }

    fn value(&self, key: &str) -> Option<&Value> {
        self.entry(key)?.value.as_ref()
    }
}
