//! Single values.

use crate::{
    joint::{
        collector::{Wording, fault},
        fields::{Catalogue, Kind, Measure},
        materials,
        tree::{Form, short},
        walk::{Stated, Walk, range},
    },
    units::{self, Quantity, UnitFault},
};

impl Walk<'_> {
    pub(super) fn text(&mut self, stated: Stated<'_>) -> Option<String> {
        match &stated.node.form {
            Form::Text(text) if !text.trim().is_empty() => Some(text.trim().to_owned()),
            Form::Text(_) => {
                self.collector.report(
                    fault(
                        "file/wrong-type",
                        &stated.node.span,
                        format!("`{}` is empty", stated.field.key),
                    )
                    .expecting(format!("expected {}", stated.field.kind.expects()))
                    .help(format!("for example `{}`", stated.field.line())),
                );
                None
            }
            Form::Number(text, _) => {
                let key = stated.key();
                let name = match stated.field.kind {
                    Kind::Name(Catalogue::Material) => materials::likely(text),
                    _ => None,
                };
                let help = match name {
                    Some(name) => format!("name it in quotes: `{key} = \"{name}\"`"),
                    None => format!("put it in quotes: `{key} = \"{}\"`", short(text)),
                };
                self.wrong_with(stated, help);
                None
            }
            _ => {
                self.wrong(stated);
                None
            }
        }
    }

    pub(super) fn choice(&mut self, stated: Stated<'_>, words: &[&'static str]) -> Option<String> {
        let text = self.text(stated)?;
        let plain = plain(&text);
        let found = words.iter().find(|word| self::plain(word) == plain);
        if found.is_none() {
            self.collector.report(
                fault(
                    "name/unknown",
                    &stated.node.span,
                    format!("`{}` is no choice of `{}`", short(&text), stated.field.key),
                )
                .expecting(format!("expected {}", stated.field.kind.expects()))
                .nearest(&text, words.iter().copied()),
            );
        }
        found.map(|word| (*word).to_owned())
    }

    pub(super) fn flag(&mut self, stated: Stated<'_>) -> Option<bool> {
        if let Form::Flag(flag) = &stated.node.form {
            Some(*flag)
        } else {
            self.wrong(stated);
            None
        }
    }

    pub(super) fn counts(&mut self, stated: Stated<'_>) -> Option<Vec<usize>> {
        let nodes = match &stated.node.form {
            Form::List(nodes) if (1..=2).contains(&nodes.len()) => nodes.as_slice(),
            Form::Number(..) => std::slice::from_ref(stated.node),
            _ => {
                self.wrong(stated);
                return None;
            }
        };
        let mut counts = Vec::with_capacity(nodes.len());
        for node in nodes {
            match node.form {
                Form::Number(_, number)
                    if number.fract() == 0.0 && (1.0..=1e9).contains(&number) =>
                {
                    counts.push(number as usize);
                }
                _ => {
                    self.wrong(Stated { node, ..stated });
                    return None;
                }
            }
        }
        Some(counts)
    }

    /// One value of a measure, within the range of its field.
    pub(super) fn single(&mut self, stated: Stated<'_>, measure: Measure) -> Option<f64> {
        let value = match measure {
            Measure::Number => self.number(stated),
            Measure::Quantity(quantity) => self
                .measured(stated, measure)
                .and_then(|text| self.told(stated, units::parse(text, quantity))),
            Measure::Roughness => self.roughness(stated),
        }?;
        let written = match &stated.node.form {
            Form::Text(text) | Form::Number(text, _) => short(text),
            _ => String::new(),
        };
        self.in_range(stated, (value, measure), &written)
    }

    /// A value that lies within the range of its field, which is told where it does not.
    pub(super) fn in_range(
        &mut self,
        stated: Stated<'_>,
        (value, measure): (f64, Measure),
        written: &str,
    ) -> Option<f64> {
        if range(stated.field).contains(&value) {
            return Some(value);
        }
        let [least, greatest] = stated.field.range;
        self.collector.report(
            fault(
                "value/range",
                &stated.node.span,
                format!(
                    "`{}` is `{written}`, beyond what it can be",
                    stated.field.key
                ),
            )
            .expecting(format!(
                "from {} to {}",
                shown(least, measure),
                shown(greatest, measure)
            ))
            .help(format!("for example `{}`", stated.field.line())),
        );
        None
    }

    fn number(&mut self, stated: Stated<'_>) -> Option<f64> {
        match &stated.node.form {
            Form::Number(_, number) => Some(*number),
            Form::Text(text) if text.trim().parse::<f64>().is_ok() => {
                let help = format!(
                    "leave the quotes out: `{} = {}`",
                    stated.field.key,
                    text.trim()
                );
                self.wrong_with(stated, help);
                None
            }
            _ => {
                self.wrong(stated);
                None
            }
        }
    }

    fn roughness(&mut self, stated: Stated<'_>) -> Option<f64> {
        let text = self.measured(stated, Measure::Roughness)?;
        self.roughness_of(stated, text)
    }

    /// Rq of a text, m.
    pub(super) fn roughness_of(&mut self, stated: Stated<'_>, text: &str) -> Option<f64> {
        let roughness = units::parse_roughness(text);
        let roughness = self.told(stated, roughness)?;
        if let Some(assumed) = roughness.assumed {
            let value = format!("Rq {}", units::show(roughness.rq, Quantity::Length));
            self.collector.assume(stated.path, value, assumed);
        }
        Some(roughness.rq)
    }

    /// The text of a value that must carry a unit.
    fn measured<'n>(&mut self, stated: Stated<'n>, measure: Measure) -> Option<&'n str> {
        let bare = match &stated.node.form {
            Form::Text(text) if text.trim().parse::<f64>().is_err() => return Some(text),
            Form::Text(text) | Form::Number(text, _) => text,
            _ => {
                self.wrong(stated);
                return None;
            }
        };
        self.collector.report(
            fault(
                "unit/bare-number",
                &stated.node.span,
                format!("`{}` of `{}` has no unit", short(bare), stated.field.key),
            )
            .expecting(format!("expected {}", measure.expects()))
            .help(format!(
                "write the unit, in quotes: `{}`",
                stated.field.line()
            )),
        );
        None
    }

    pub(super) fn told<T>(
        &mut self,
        stated: Stated<'_>,
        parsed: Result<T, UnitFault>,
    ) -> Option<T> {
        match parsed {
            Ok(value) => Some(value),
            Err(unit) => {
                let help = unit
                    .help
                    .unwrap_or_else(|| format!("for example `{}`", stated.field.line()));
                self.collector.report(
                    fault(unit.code, &stated.node.span, unit.message)
                        .expecting(format!("expected {}", stated.field.kind.expects()))
                        .help(help),
                );
                None
            }
        }
    }

    pub(super) fn wrong_with(&mut self, stated: Stated<'_>, help: String) {
        self.collector.report(
            super::wrong_type(
                stated.node,
                &format!("`{}`", stated.key()),
                &stated.field.kind.expects(),
            )
            .help(help),
        );
    }
}

/// A word without regard to case and to how its parts are joined.
fn plain(word: &str) -> String {
    word.trim().to_lowercase().replace(['-', '_'], " ")
}

/// A limit of a field, for a label.
pub(super) fn shown(value: f64, measure: Measure) -> String {
    match measure {
        Measure::Quantity(quantity) => units::show(value, quantity),
        Measure::Roughness => units::show(value, Quantity::Length),
        Measure::Number => value.to_string(),
    }
}
