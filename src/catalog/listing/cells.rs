//! How values are written into the cells of a table.

use crate::catalog::records::{Datum, Status};

pub(super) fn status(status: Status) -> String {
    match status {
        Status::Seen => "seen",
        Status::Memory => "memory",
        Status::Computed => "computed",
        Status::Judgement => "judgement",
        Status::User => "user",
    }
    .to_owned()
}

/// A number to four significant digits, without trailing zeros or binary dust.
pub(super) fn number(value: f64) -> String {
    if value == 0.0 || !value.is_finite() {
        return value.to_string();
    }
    let decimals = 3 - value.abs().log10().floor() as i32;
    let text = format!("{value:.*}", decimals.clamp(0, 12) as usize);
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// A value in a unit with its range: `167 (155–180)`.
pub(super) fn spread(datum: &Datum, unit: f64) -> String {
    let value = number(datum.value / unit);
    match datum.range {
        Some([low, high]) => format!("{value} ({}–{})", number(low / unit), number(high / unit)),
        None => value,
    }
}

pub(super) fn maybe(datum: Option<&Datum>, unit: f64) -> String {
    datum.map_or_else(|| "–".to_owned(), |datum| spread(datum, unit))
}

pub(super) fn length(value: Option<f64>, unit: f64) -> String {
    value.map_or_else(|| "–".to_owned(), |value| number(value / unit))
}

pub(super) fn yes(answer: bool) -> String {
    if answer { "yes" } else { "no" }.to_owned()
}

/// Status and source of a record whose values may differ: the first value leads, the others are
/// named only where they depart from it.
pub(super) fn origin(values: &[(&str, Option<&Datum>)]) -> [String; 2] {
    let known: Vec<(&str, &Datum)> = values
        .iter()
        .filter_map(|(symbol, datum)| Some((*symbol, (*datum)?)))
        .collect();
    let mut states: Vec<(Status, Vec<&str>)> = Vec::new();
    let mut sources: Vec<&str> = Vec::new();
    for (symbol, datum) in known {
        match states
            .iter_mut()
            .find(|(status, _)| *status == datum.status)
        {
            Some((_, symbols)) => symbols.push(symbol),
            None => states.push((datum.status, vec![symbol])),
        }
        if !sources.contains(&datum.source.as_str()) {
            sources.push(&datum.source);
        }
    }
    let told = states.iter().enumerate().map(|(place, (state, symbols))| {
        if place == 0 {
            status(*state)
        } else {
            format!("{}: {}", status(*state), symbols.join(", "))
        }
    });
    [told.collect::<Vec<_>>().join("; "), sources.join("; ")]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_keep_four_digits_and_no_dust() {
        for (value, text) in [
            (167.0, "167"),
            (23.636, "23.64"),
            (0.0, "0"),
            (0.1 + 0.2, "0.3"),
            (1131.6, "1132"),
            (16_400.0, "16400"),
            (0.005, "0.005"),
            (1.55e-6 / 1e-6, "1.55"),
        ] {
            assert_eq!(number(value), text);
        }
    }

    #[test]
    fn a_record_of_mixed_origin_says_so() {
        let datum = |status, source: &str| Datum {
            value: 1.0,
            range: None,
            status,
            source: source.to_owned(),
        };
        let (seen, memory) = (
            datum(Status::Seen, "a sheet"),
            datum(Status::Memory, "a book"),
        );
        assert_eq!(
            origin(&[
                ("k", Some(&seen)),
                ("E", Some(&memory)),
                ("H", None),
                ("ν", Some(&memory))
            ]),
            ["seen; memory: E, ν", "a sheet; a book"]
        );
        assert_eq!(origin(&[("k", Some(&seen))]), ["seen", "a sheet"]);
    }
}
