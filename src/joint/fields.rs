//! One description of the joint file: it feeds the reader, the nearest-key hints, `--set`, the
//! schema and the manual.

use crate::units::Quantity;

/// A table of the joint file.
#[derive(Debug)]
pub struct Section {
    /// Its key in the file.
    pub name: &'static str,
    /// What it holds, in one line.
    pub meaning: &'static str,
    /// The key that a plain value in place of the table stands for: `torque = "2 N·m"`.
    pub shorthand: Option<&'static str>,
    /// Its fields.
    pub fields: &'static [Field],
}

/// One field of a table.
#[derive(Debug)]
pub struct Field {
    /// Key.
    pub key: &'static str,
    /// What it takes.
    pub kind: Kind,
    /// Whether the file must state it.
    pub need: Need,
    /// Least and greatest value, SI.
    pub range: [f64; 2],
    /// What it is, in one line.
    pub meaning: &'static str,
    /// A value that works, as TOML.
    pub example: &'static str,
    /// What is taken when the file does not state it; empty when nothing is.
    pub default: &'static str,
}

/// Whether the file must state a field.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Need {
    /// It must.
    Required,
    /// It may.
    Optional,
}

/// What a field takes.
#[derive(Clone, Copy, Debug)]
pub enum Kind {
    /// Free text.
    Text,
    /// A name from the catalogue (or, for materials, from the file).
    Name(Catalogue),
    /// `true` or `false`.
    Flag,
    /// A number without dimension.
    Number,
    /// One of a few words.
    Choice(&'static [&'static str]),
    /// One of a few words, or a list of them.
    Choices(&'static [&'static str]),
    /// Text with a unit.
    Quantity(Quantity),
    /// Text with a unit, or one of a few words.
    QuantityOr(Quantity, &'static [&'static str]),
    /// A value with or without its spread: `"5 mm ± 2 %"`, `"4.9 mm to 5.1 mm"`, `[low, high]`,
    /// `[low, nominal, high]`, or a table that may name a distribution.
    Spread(Measure),
    /// The same of a quantity, or one of a few words.
    SpreadOrWord(Quantity, &'static [&'static str]),
    /// A spread of numbers, or a name from the catalogue.
    SpreadOr(Catalogue),
    /// One value for all plates, a list of one for each, or a table by plate name with `*` for the others.
    PerPlate(Measure),
    /// Two names.
    Names,
    /// Two lengths.
    Point,
    /// A list of points.
    Points,
    /// A list of pairs of quantities.
    Pairs([Quantity; 2]),
    /// A whole number, or two.
    Count,
    /// A table.
    Table(&'static Section),
    /// Tables that may stand more than once.
    List(&'static Section),
    /// Tables of overrides, each with a name.
    Variants,
}

/// What a single value of a spread is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Measure {
    /// A number without dimension.
    Number,
    /// Text with a unit.
    Quantity(Quantity),
    /// Roughness with its parameter: `Ra 0.8 µm`.
    Roughness,
}

/// A part of the catalogue that names things.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Catalogue {
    /// Plate materials.
    Material,
    /// Finishes by process.
    Finish,
    /// Platings and films.
    Plating,
    /// Threads.
    Thread,
    /// Strength grades.
    Grade,
    /// Bolt heads.
    Head,
    /// Washers.
    Washer,
    /// Friction classes and pairs.
    Friction,
    /// Nut factors by condition.
    NutFactor,
    /// Tightening methods.
    Method,
    /// Gases, and vacuum.
    Medium,
    /// Fillers.
    Filler,
}

/// Name that stands for every plate that is not named.
pub const OTHERS: &str = "*";

/// Keys of a spread given as a table; the first four hold values.
pub const SPREAD_KEYS: [&str; 5] = ["low", "nominal", "high", "sigma", "distribution"];

/// Names of distributions: the first two take low and high, the others nominal and sigma.
pub const DISTRIBUTIONS: [&str; 4] = ["uniform", "triangular", "normal", "lognormal"];

/// A field that may be left out, of any value.
pub(super) const fn field(
    key: &'static str,
    kind: Kind,
    meaning: &'static str,
    example: &'static str,
) -> Field {
    Field {
        key,
        kind,
        need: Need::Optional,
        range: [f64::NEG_INFINITY, f64::INFINITY],
        meaning,
        example,
        default: "",
    }
}

impl Field {
    /// The same field, which the file must state.
    pub(super) const fn required(self) -> Self {
        Self {
            need: Need::Required,
            ..self
        }
    }

    /// The same field, between a least and a greatest value, SI.
    pub(super) const fn within(self, least: f64, greatest: f64) -> Self {
        Self {
            range: [least, greatest],
            ..self
        }
    }

    /// The same field, with a note of what is taken when it is not stated.
    pub(super) const fn default(self, note: &'static str) -> Self {
        Self {
            default: note,
            ..self
        }
    }

    /// The line that would state it: `thickness = "5 mm"`.
    pub fn line(&self) -> String {
        format!("{} = {}", self.key, self.example)
    }
}

impl Section {
    /// The field under a key.
    pub fn field(&self, key: &str) -> Option<&'static Field> {
        self.fields.iter().find(|field| field.key == key)
    }

    /// Its keys.
    pub fn keys(&self) -> impl Iterator<Item = &'static str> {
        self.fields.iter().map(|field| field.key)
    }
}

impl Kind {
    /// What the field takes, for a sentence: `a length with its unit`.
    pub fn expects(self) -> String {
        match self {
            Self::Text => "text in quotes".into(),
            Self::Name(catalogue) => format!("{} in quotes", catalogue.expects()),
            Self::Flag => "`true` or `false`".into(),
            Self::Number => "a number".into(),
            Self::Choice(words) => format!("one of {}", listed(words)),
            Self::Choices(words) => format!("one or several of {}", listed(words)),
            Self::Quantity(quantity) => Measure::Quantity(quantity).expects(),
            Self::QuantityOr(quantity, words) => format!(
                "{} or {}",
                Measure::Quantity(quantity).expects(),
                listed(words)
            ),
            Self::Spread(measure) => format!("{} or a range of them", measure.expects()),
            Self::SpreadOrWord(quantity, words) => format!(
                "{}, a range of them or {}",
                Measure::Quantity(quantity).expects(),
                listed(words)
            ),
            Self::SpreadOr(catalogue) => {
                format!("a number, a range of them or {}", catalogue.expects())
            }
            Self::PerPlate(measure) => format!(
                "{}, one per plate, or a table by plate name",
                measure.expects()
            ),
            Self::Names => "two names, `[\"base\", \"shim\"]`".into(),
            Self::Point => "two lengths, `[\"80 mm\", \"60 mm\"]`".into(),
            Self::Points => "a list of points, `[[\"10 mm\", \"10 mm\"], …]`".into(),
            Self::Pairs([first, second]) => {
                format!("a list of pairs of {} and {}", first.name(), second.name())
            }
            Self::Count => "a whole number, or two".into(),
            Self::Table(section) => match section.shorthand.and_then(|key| section.field(key)) {
                Some(field) => format!("{} or a table", field.kind.expects()),
                None => "a table in braces".into(),
            },
            Self::List(section) => format!("tables headed `[[{}]]`", section.name),
            Self::Variants => "tables headed `[[variant]]`".into(),
        }
    }
}

impl Measure {
    /// What a single value is, for a sentence.
    pub fn expects(self) -> String {
        match self {
            Self::Number => "a number".into(),
            Self::Quantity(quantity) => format!("{} with its unit", quantity.with_article()),
            Self::Roughness => "a roughness such as `Ra 0.8 µm`".into(),
        }
    }
}

impl Catalogue {
    /// What it names, for a sentence.
    pub fn expects(self) -> &'static str {
        match self {
            Self::Material => "the name of a material",
            Self::Finish => "the name of a finishing process",
            Self::Plating => "the name of a plating",
            Self::Thread => "a thread such as `M5` or `1/4-20`",
            Self::Grade => "a strength grade such as `8.8` or `A2-70`",
            Self::Head => "a head such as `hex` or `socket`",
            Self::Washer => "the standard of a washer",
            Self::Friction => "a friction class",
            Self::NutFactor => "the name of a nut factor",
            Self::Method => "the name of a tightening method",
            Self::Medium => "`vacuum` or the name of a gas",
            Self::Filler => "the name of a filler",
        }
    }
}

/// Words in a sentence: `` `most` or `least` ``.
pub(super) fn listed(words: &[&str]) -> String {
    let quoted: Vec<String> = words.iter().map(|word| format!("`{word}`")).collect();
    match quoted.split_last() {
        Some((last, [])) => last.clone(),
        Some((last, rest)) => format!("{} or {last}", rest.join(", ")),
        None => String::new(),
    }
}
