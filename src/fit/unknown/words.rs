//! What can be unknown: a field of the joint file by its path, or an uncertain input.

use crate::{
    fit::unknown::{Failure, question},
    joint::Joint,
};

/// A word for an unknown, what it stands for, and between which values it is sought unless told.
#[derive(Clone, Copy, Debug)]
pub struct Word {
    /// The word.
    pub name: &'static str,
    /// What it stands for.
    pub meaning: &'static str,
    /// Between which values; none for an uncertain input, which has its own range.
    range: Option<[&'static str; 2]>,
    /// How the names of the uncertain inputs begin that it takes the place of.
    own: &'static [&'static str],
    place: Place,
}

impl Word {
    /// Between which values it is sought unless told, in brackets; nothing for an uncertain input.
    pub fn between(&self) -> String {
        self.range
            .map_or_else(String::new, |[from, to]| format!(" ({from} to {to})"))
    }
}

/// Where a word acts.
#[derive(Clone, Copy, Debug)]
enum Place {
    /// A field of every plate.
    EveryPlate(&'static str),
    /// A field of the first plate.
    FirstPlate(&'static str),
    /// Fields of every fastener group.
    EveryFastener(&'static [&'static str]),
    /// A path.
    Path(&'static str),
    /// An uncertain input whose name begins so.
    Input(&'static [&'static str]),
}

/// The words, in the order in which force and heat flow.
pub const WORDS: &[Word] = &[
    Word {
        name: "friction",
        meaning: "friction of thread and head of every bolt, alike",
        range: Some(["0.06", "0.35"]),
        own: &["friction"],
        place: Place::EveryFastener(&["friction.thread", "friction.head"]),
    },
    Word {
        name: "roughness",
        meaning: "roughness of every plate's finish, alike",
        range: Some(["Rq 0.1 µm", "Rq 10 µm"]),
        own: &["roughness"],
        place: Place::EveryPlate("finish.roughness"),
    },
    Word {
        name: "slope",
        meaning: "asperity slope of every plate's finish, alike",
        range: Some(["0.02", "0.4"]),
        own: &["asperity slope"],
        place: Place::EveryPlate("finish.slope"),
    },
    Word {
        name: "flatness",
        meaning: "bow of the first plate",
        range: Some(["-100 µm", "100 µm"]),
        own: &[],
        place: Place::FirstPlate("bow"),
    },
    Word {
        name: "bond_line",
        meaning: "bond line of the filler",
        range: Some(["5 µm", "500 µm"]),
        own: &[],
        place: Place::Path("filler.bond_line"),
    },
    Word {
        name: "filler_conductivity",
        meaning: "conductivity of the filler",
        range: Some(["0.1 W/(m·K)", "20 W/(m·K)"]),
        own: &[],
        place: Place::Path("filler.conductivity"),
    },
    Word {
        name: "hardness",
        meaning: "hardness of the faces, −1 low to +1 high in its range",
        range: None,
        own: &[],
        place: Place::Input(&["hardness of the faces"]),
    },
    Word {
        name: "law",
        meaning: "law of the solid spots or own measurements, in standard deviations",
        range: None,
        own: &[],
        place: Place::Input(&["law of the solid spots", "own measurements"]),
    },
    Word {
        name: "filler",
        meaning: "resistance of the filler, in standard deviations",
        range: None,
        own: &[],
        place: Place::Input(&["filler"]),
    },
];

/// An unknown of a joint.
#[derive(Clone, Debug, PartialEq)]
pub enum Unknown {
    /// Fields of the joint file, all with one value.
    Fields {
        /// Their paths.
        paths: Vec<String>,
        /// How a value is written.
        template: Template,
        /// How the names of the uncertain inputs begin that it takes the place of.
        own: &'static [&'static str],
    },
    /// An uncertain input, where it lies in its own range.
    Input {
        /// Its name.
        name: &'static str,
    },
}

impl Unknown {
    /// The value as people read it.
    pub fn shown(&self, value: f64) -> String {
        let value = crate::units::show(value, crate::units::Quantity::Curvature);
        let number = value.split(' ').next().unwrap_or_default();
        match self {
            Self::Fields { template, .. } => template.with(number),
            Self::Input { .. } => number.to_owned(),
        }
    }

    /// How its values are written, with `…` for the number.
    pub fn scale(&self) -> String {
        match self {
            Self::Fields { template, .. } => template.with("…"),
            Self::Input { .. } => "place in its range".to_owned(),
        }
    }

    /// What it is called.
    pub fn name(&self) -> String {
        match self {
            Self::Fields { paths, .. } => paths.join(", "),
            Self::Input { name } => (*name).to_owned(),
        }
    }

    /// Whether it takes the place of an uncertain input of this name.
    pub(super) fn replaces(&self, input: &str) -> bool {
        match self {
            Self::Fields { own, .. } => own.iter().any(|start| input.starts_with(start)),
            Self::Input { name } => *name == input,
        }
    }

    /// Overrides that give the joint a value.
    pub fn sets(&self, value: f64) -> Vec<String> {
        match self {
            Self::Fields {
                paths, template, ..
            } => paths
                .iter()
                .map(|path| format!("{path}={}", template.with(&value.to_string())))
                .collect(),
            Self::Input { .. } => Vec::new(),
        }
    }
}

/// How a value is written: `Rq `, the number, ` µm`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Template {
    before: String,
    after: String,
}

impl Template {
    /// The template of a written value, and its number; none without a number.
    pub fn of(text: &str) -> Option<(Self, f64)> {
        let text = text.trim();
        let start = text.find(|sign: char| sign.is_ascii_digit())?;
        let signed = text[..start]
            .strip_suffix(['-', '−', '+', '.'])
            .map_or(start, str::len);
        let digits = |sign: char| !(sign.is_ascii_digit() || sign == '.');
        let length = text[start..].find(digits).unwrap_or(text.len() - start);
        let number = text[signed..start + length].replace('−', "-");
        let value = number
            .parse::<f64>()
            .ok()
            .filter(|value| value.is_finite())?;
        let template = Self {
            before: text[..signed].to_owned(),
            after: text[start + length..].to_owned(),
        };
        Some((template, value))
    }

    fn with(&self, number: &str) -> String {
        format!("{}{number}{}", self.before, self.after)
    }
}

/// The unknown that a word or a path names, and the ends of its range.
///
/// `ends` are `--from` and `--to` as written.
pub(super) fn named(
    joint: &Joint,
    asked: &str,
    ends: [Option<&str>; 2],
) -> Result<(Unknown, [f64; 2]), Failure> {
    let word = WORDS.iter().find(|word| word.name == asked);
    let paths = match word.map(|word| word.place) {
        Some(Place::Input(names)) => return input(joint, asked, names, ends),
        Some(Place::EveryPlate(field)) => joint
            .plates
            .iter()
            .map(|plate| format!("plate.\"{}\".{field}", plate.name))
            .collect(),
        Some(Place::FirstPlate(field)) => vec![format!("plate.\"{}\".{field}", joint.warm().name)],
        Some(Place::EveryFastener(fields)) => {
            let groups = joint.fasteners.len();
            let path = |group: usize, field: &str| match groups {
                1 => format!("fastener.{field}"),
                _ => format!("fastener[{}].{field}", group + 1),
            };
            (0..groups)
                .flat_map(|group| fields.iter().map(move |field| path(group, field)))
                .collect()
        }
        Some(Place::Path(path)) => vec![path.to_owned()],
        None if asked.contains('.') => vec![asked.to_owned()],
        None => {
            let words: Vec<&str> = WORDS.iter().map(|word| word.name).collect();
            return Err(question(
                format!("`{asked}` is no unknown"),
                format!(
                    "name a field as --set does, `plate.upper.finish.roughness`, or one of {}",
                    words.join(", ")
                ),
            ));
        }
    };
    let usual = word.and_then(|word| word.range);
    let end = |at: usize| ends[at].or(usual.map(|usual| usual[at]));
    let (Some(from), Some(to)) = (end(0), end(1)) else {
        return Err(question(
            format!("between which values is `{asked}` sought?"),
            "state both ends: `--from \"0.2 mm\" --to \"6 mm\"`",
        ));
    };
    let (Some((template, low)), Some((other, high))) = (Template::of(from), Template::of(to))
    else {
        return Err(question(
            format!("`{from}` to `{to}` are no two values"),
            "state both ends with a number each: `--from \"Rq 0.2 µm\" --to \"Rq 6 µm\"`",
        ));
    };
    if template != other {
        return Err(question(
            format!("`{from}` and `{to}` are not written alike"),
            "write both ends in one unit: `--from \"0.2 mm\" --to \"6 mm\"`",
        ));
    }
    let own = word.map_or(&[][..], |word| word.own);
    let unknown = Unknown::Fields {
        paths,
        template,
        own,
    };
    Ok((unknown, [low, high]))
}

/// An uncertain input of this joint; its ends are numbers.
fn input(
    joint: &Joint,
    asked: &str,
    names: &[&'static str],
    ends: [Option<&str>; 2],
) -> Result<(Unknown, [f64; 2]), Failure> {
    let chain = crate::estimate::Chain::new(joint);
    let known = chain
        .map(|chain| crate::uncertainty::inputs(&chain))
        .unwrap_or_default();
    let found = known.iter().find(|input| names.contains(&input.name));
    let Some(input) = found else {
        return Err(question(
            format!("`{asked}` leaves nothing open in this joint"),
            "fit another unknown",
        ));
    };
    let usual = super::bench::extent(input);
    let mut range = usual;
    for (end, written) in range.iter_mut().zip(ends) {
        if let Some(written) = written {
            *end = written
                .trim()
                .parse::<f64>()
                .ok()
                .filter(|v| v.is_finite())
                .ok_or_else(|| {
                    question(
                        format!("`{written}` is no place of `{asked}`"),
                        format!("give a number from {:.0} to {:.0}", usual[0], usual[1]),
                    )
                })?;
        }
    }
    if range[0] < usual[0] || range[1] > usual[1] {
        return Err(question(
            format!("`{asked}` lies between {:.0} and {:.0}", usual[0], usual[1]),
            "leave out --from and --to for the whole of it",
        ));
    }
    Ok((Unknown::Input { name: input.name }, range))
}
