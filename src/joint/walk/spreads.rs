//! Values with their spread: `5 mm ± 2 %`, `0.8 µm to 1.6 µm`, lists, and named distributions.

use crate::{
    joint::{
        Bounds,
        collector::{Wording, fault},
        fields::{DISTRIBUTIONS, Measure, SPREAD_KEYS, listed},
        record::{Spread, Width},
        tree::{Form, Key, Node, short},
        walk::{Stated, Walk, scalars::shown},
    },
    numerics::distribution::{CUT, Shape},
    units::{self, Quantity},
};

/// Words between a value and its half width, and between two ends.
const PLUS_MINUS: [&str; 3] = ["±", "+/-", "+-"];
const TO: &str = " to ";

/// Values of a spread given as a table, in the order of [`SPREAD_KEYS`].
const LOW: usize = 0;
const NOMINAL: usize = 1;
const HIGH: usize = 2;

/// Whether a text states a number with its spread rather than a name.
pub(super) fn is_spread(text: &str) -> bool {
    text.trim_start().starts_with(super::starts_a_number)
        && (PLUS_MINUS.iter().any(|sign| text.contains(sign)) || text.contains(TO))
}

/// Deviation of a value: a part of it, or of its own measure.
#[derive(Clone, Copy, Debug)]
enum Deviation {
    Relative(f64),
    Absolute(f64),
}

impl Deviation {
    fn of(self, nominal: f64) -> f64 {
        match self {
            Self::Relative(part) => part * nominal.abs(),
            Self::Absolute(width) => width,
        }
    }
}

impl Walk<'_> {
    /// One value, with or without its spread.
    pub(super) fn spread(&mut self, stated: Stated<'_>, measure: Measure) -> Option<Spread> {
        match &stated.node.form {
            Form::List(nodes) => {
                let places: &[usize] = match nodes.len() {
                    2 => &[LOW, HIGH],
                    3 => &[LOW, NOMINAL, HIGH],
                    _ => {
                        self.wrong(stated);
                        return None;
                    }
                };
                let read: Vec<Option<f64>> = nodes
                    .iter()
                    .map(|node| self.single(Stated { node, ..stated }, measure))
                    .collect();
                let mut parts = [None; 3];
                for (place, value) in places.iter().zip(read) {
                    parts[*place] = Some(value?);
                }
                self.between(stated, parts, Shape::Uniform)
            }
            Form::Table(entries) => self.distribution(stated, entries, measure),
            Form::Text(text) => {
                let halves = PLUS_MINUS.iter().find_map(|sign| text.split_once(sign));
                match (halves, text.split_once(TO)) {
                    (Some(halves), _) => self.plus_minus(stated, halves, measure),
                    (None, Some(ends)) => self.ends_of(stated, ends, measure),
                    (None, None) => self.exact(stated, measure),
                }
            }
            _ => self.exact(stated, measure),
        }
    }

    fn exact(&mut self, stated: Stated<'_>, measure: Measure) -> Option<Spread> {
        self.single(stated, measure).map(|value| Spread {
            bounds: Bounds::exact(value),
            width: Width::Single,
        })
    }

    /// `5 mm ± 2 %`, `5 mm ± 0.1 mm`, `5 ± 0.1 mm`: the same weight everywhere.
    fn plus_minus(
        &mut self,
        stated: Stated<'_>,
        (value, width): (&str, &str),
        measure: Measure,
    ) -> Option<Spread> {
        let (value, width) = (value.trim(), width.trim());
        let nominal = self.part(stated, &completed(value, width), measure);
        let width = self.deviation(stated, width, (value, measure));
        let (nominal, width) = (nominal?, width?.of(nominal?));
        self.about(stated, (nominal, measure), [width, width], Shape::Uniform)
    }

    /// `0.8 µm to 1.6 µm`, `0.8 to 1.6 µm`: the same weight everywhere.
    fn ends_of(
        &mut self,
        stated: Stated<'_>,
        (low, high): (&str, &str),
        measure: Measure,
    ) -> Option<Spread> {
        let (low, high) = (low.trim(), high.trim());
        let ends = [
            self.part(stated, &completed(low, high), measure),
            self.part(stated, &format!("{}{high}", prefix(low, high)), measure),
        ];
        self.between(stated, [ends[0], None, ends[1]], Shape::Uniform)
            .filter(|_| ends.iter().all(Option::is_some))
    }

    /// A part of a text as a value within the range of the field.
    fn part(&mut self, stated: Stated<'_>, text: &str, measure: Measure) -> Option<f64> {
        let value = match measure {
            Measure::Quantity(quantity) => self.told(stated, units::parse(text, quantity)),
            Measure::Roughness => self.roughness_of(stated, text),
            Measure::Number => {
                let number = text
                    .trim()
                    .parse::<f64>()
                    .ok()
                    .filter(|value| value.is_finite());
                if number.is_none() {
                    self.no_part(stated, text);
                }
                number
            }
        }?;
        self.in_range(stated, (value, measure), &short(text))
    }

    /// A half width: in percent of the value, or in its own unit; of a percentage in its own.
    fn deviation(
        &mut self,
        stated: Stated<'_>,
        text: &str,
        (value, measure): (&str, Measure),
    ) -> Option<Deviation> {
        let own_percent = matches!(measure, Measure::Quantity(Quantity::Ratio));
        let read = if text.ends_with('%') && !own_percent {
            self.told(stated, units::parse(text, Quantity::Ratio))
                .map(Deviation::Relative)
        } else {
            match measure {
                Measure::Quantity(Quantity::Temperature) => {
                    self.told(stated, units::parse(text, Quantity::TemperatureDifference))
                }
                Measure::Quantity(quantity) => self.told(stated, units::parse(text, quantity)),
                Measure::Roughness => {
                    self.roughness_of(stated, &format!("{}{text}", prefix(value, text)))
                }
                Measure::Number => {
                    let number = text.parse::<f64>().ok();
                    if number.is_none() {
                        self.no_part(stated, text);
                    }
                    number
                }
            }
            .map(Deviation::Absolute)
        }?;
        let (Deviation::Relative(size) | Deviation::Absolute(size)) = read;
        if size > 0.0 && size.is_finite() {
            return Some(read);
        }
        self.collector.report(
            fault(
                "value/distribution",
                &stated.node.span,
                format!("`{}` deviates by `{}`", stated.field.key, short(text)),
            )
            .expecting("expected a deviation above zero")
            .help("leave it out where there is none"),
        );
        None
    }

    /// A table of values that may name a distribution.
    fn distribution(
        &mut self,
        stated: Stated<'_>,
        entries: &[(Key, Node)],
        measure: Measure,
    ) -> Option<Spread> {
        let mut parts = [None; 3];
        let mut sigma = None;
        let mut name = None;
        let mut good = true;
        for (key, node) in entries {
            let at = Stated { node, ..stated };
            match SPREAD_KEYS.iter().position(|known| *known == key.name) {
                Some(place @ ..=HIGH) => {
                    parts[place] = self.single(at, measure);
                    good &= parts[place].is_some();
                }
                Some(3) => sigma = Some(at),
                Some(_) => {
                    name = self.choice(at, &DISTRIBUTIONS);
                    good &= name.is_some();
                }
                None => {
                    self.collector.report(
                        fault(
                            "file/unknown-key",
                            &key.span,
                            format!("unknown key `{}`", short(&key.name)),
                        )
                        .expecting(format!("expected {}", listed(&SPREAD_KEYS)))
                        .nearest(&key.name, SPREAD_KEYS.into_iter()),
                    );
                    good = false;
                }
            }
        }
        if !good {
            return None;
        }
        let shape = match (name.as_deref(), sigma) {
            (None | Some("uniform"), None) => Shape::Uniform,
            (Some("triangular"), None) => Shape::Triangular,
            (None | Some("normal"), Some(_)) => Shape::Normal,
            (Some("lognormal"), Some(_)) => Shape::LogNormal,
            (Some("uniform" | "triangular"), Some(_)) => {
                return self.mixed(stated, "is stated by low and high, not by sigma");
            }
            _ => return self.mixed(stated, "needs its sigma"),
        };
        match (sigma, parts) {
            (None, _) => self.between(stated, parts, shape),
            (Some(sigma), [None, Some(nominal), None]) => {
                self.about_sigma(stated, sigma, (nominal, measure, shape))
            }
            _ => self.mixed(
                stated,
                "with a sigma has one nominal value and no low or high",
            ),
        }
    }

    /// A distribution by its standard deviation; its ends lie at three of them.
    fn about_sigma(
        &mut self,
        stated: Stated<'_>,
        sigma: Stated<'_>,
        (nominal, measure, shape): (f64, Measure, Shape),
    ) -> Option<Spread> {
        let size = match &sigma.node.form {
            Form::Text(text) => self.deviation(sigma, text.trim(), ("", measure))?,
            Form::Number(_, number) if matches!(measure, Measure::Number) && *number > 0.0 => {
                Deviation::Absolute(*number)
            }
            _ => {
                self.wrong_with(sigma, "for example `sigma = \"5 %\"`".to_owned());
                return None;
            }
        };
        if shape == Shape::Normal {
            let width = CUT * size.of(nominal);
            return self.about(stated, (nominal, measure), [width, width], shape);
        }
        let Deviation::Relative(part) = size else {
            return self.mixed(
                stated,
                "that is lognormal has its sigma in percent: one standard deviation is a factor \
                 of 1 + sigma either way",
            );
        };
        if nominal <= 0.0 {
            return self.mixed(stated, "that is lognormal lies above zero");
        }
        let factor = (1.0 + part).powf(CUT);
        let width = [nominal - nominal / factor, nominal * factor - nominal];
        self.about(stated, (nominal, measure), width, shape)
    }

    /// A nominal value with its widths to the low and the high end, both within the field's range.
    fn about(
        &mut self,
        stated: Stated<'_>,
        (nominal, measure): (f64, Measure),
        [below, above]: [f64; 2],
        shape: Shape,
    ) -> Option<Spread> {
        let ends = [nominal - below, nominal + above];
        let [least, greatest] = stated.field.range;
        if least <= ends[0] && ends[1] <= greatest {
            return Some(Spread {
                bounds: Bounds {
                    low: ends[0],
                    nominal,
                    high: ends[1],
                    shape,
                },
                width: Width::Range,
            });
        }
        let help = if shape == Shape::Normal {
            "a normal distribution ends at three sigma; `distribution = \"lognormal\"` with sigma \
             in percent stays above zero"
        } else {
            "state a closer spread, or low and high: `[low, nominal, high]`"
        };
        self.collector.report(
            fault(
                "value/distribution",
                &stated.node.span,
                format!(
                    "`{}` would lie from {} to {}",
                    stated.field.key,
                    shown(ends[0], measure),
                    shown(ends[1], measure)
                ),
            )
            .expecting(format!(
                "it can be from {} to {}",
                shown(least, measure),
                shown(greatest, measure)
            ))
            .help(help),
        );
        None
    }

    fn mixed(&mut self, stated: Stated<'_>, why: &str) -> Option<Spread> {
        self.collector.report(
            fault(
                "value/distribution",
                &stated.node.span,
                format!("`{}` {why}", stated.field.key),
            )
            .expecting("low and high, or nominal and sigma")
            .help(
                "`{ low = …, nominal = …, high = …, distribution = \"uniform\" }` (or \
                 `\"triangular\"`), or `{ nominal = …, sigma = \"5 %\", distribution = \"normal\" \
                 }` (or `\"lognormal\"`)",
            ),
        );
        None
    }

    fn no_part(&mut self, stated: Stated<'_>, text: &str) {
        self.collector.report(
            fault(
                "value/distribution",
                &stated.node.span,
                format!("`{}` is no number", short(text)),
            )
            .expecting("expected a value with its spread")
            .help("for example `\"0.12 ± 10 %\"` or `\"0.08 to 0.16\"`"),
        );
    }

    fn between(
        &mut self,
        stated: Stated<'_>,
        parts: [Option<f64>; 3],
        shape: Shape,
    ) -> Option<Spread> {
        let [low, nominal, high] = match parts {
            [Some(low), Some(nominal), Some(high)] => [low, nominal, high],
            [Some(low), None, Some(high)] => [low, f64::midpoint(low, high), high],
            [None, Some(nominal), None] if shape == Shape::Uniform => {
                return Some(Spread {
                    bounds: Bounds::exact(nominal),
                    width: Width::Single,
                });
            }
            _ => {
                self.wrong_with(
                    stated,
                    "give low and high, with or without nominal".to_owned(),
                );
                return None;
            }
        };
        if low <= nominal && nominal <= high {
            return Some(Spread {
                bounds: Bounds {
                    low,
                    nominal,
                    high,
                    shape,
                },
                width: Width::Range,
            });
        }
        self.collector.report(
            fault(
                "value/min-above-max",
                &stated.node.span,
                format!("the values of `{}` do not rise", stated.field.key),
            )
            .expecting("expected low ≤ nominal ≤ high")
            .help("give the lowest first"),
        );
        None
    }
}

/// A value that leaves its unit to what follows: `5` of `5 ± 0.1 mm`.
fn completed(value: &str, after: &str) -> String {
    let bare = value.ends_with(|letter: char| letter.is_ascii_digit() || letter == '.');
    let unit = after.trim_start_matches(|letter: char| !letter.is_ascii_digit());
    let unit = unit.trim_start_matches(|letter: char| {
        letter.is_ascii_digit() || matches!(letter, '.' | '_' | ' ')
    });
    if bare && !unit.is_empty() && unit != "%" {
        format!("{value} {unit}")
    } else {
        value.to_owned()
    }
}

/// The parameter of a roughness that holds for what follows: `Ra` of `Ra 0.8 µm to 1.6 µm`.
fn prefix(value: &str, after: &str) -> String {
    let letters: String = value
        .chars()
        .take_while(|letter| letter.is_alphabetic())
        .collect();
    let own = after.starts_with(char::is_alphabetic);
    if letters.is_empty() || own {
        String::new()
    } else {
        format!("{letters} ")
    }
}
