//! Numbers for people: four significant digits, and what may stand on a terminal.

use crate::estimate::Band;

/// Significant digits of every printed number.
const DIGITS: i32 = 4;

/// Four significant digits; a number that is not finite prints as a dash.
///
/// Plain notation from 0.0001 up to a million, powers of ten beyond.
pub fn four(value: f64) -> String {
    if !value.is_finite() {
        return "–".to_owned();
    }
    if value == 0.0 {
        return "0".to_owned();
    }
    // Rounding first, so that 9999.6 counts as five digits before the point.
    let rounded = format!("{value:.*e}", (DIGITS - 1) as usize);
    let exponent: i32 = rounded
        .rsplit('e')
        .next()
        .and_then(|digits| digits.parse().ok())
        .unwrap_or(0);
    if (-4..DIGITS + 2).contains(&exponent) {
        let decimals = (DIGITS - 1 - exponent).max(0);
        let plain: f64 = rounded.parse().unwrap_or(value);
        format!("{plain:.*}", decimals as usize)
    } else {
        rounded
    }
}

/// At most four significant digits without the zeros that follow: for values given in round numbers.
pub fn brief(value: f64) -> String {
    let text = four(value);
    if text.contains('.') && !text.contains('e') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// Four significant digits, or a dash where there is no value.
pub fn optional(value: Option<f64>) -> String {
    value.map_or_else(|| "–".to_owned(), four)
}

/// Low, nominal and high of a band, each divided by `unit`.
pub fn band(band: &Band, unit: f64) -> [String; 3] {
    [
        optional(band.low.map(|low| low / unit)),
        four(band.nominal / unit),
        optional(band.high.map(|high| high / unit)),
    ]
}

/// One cell: nominal with low and high behind it, when there are any.
pub fn spread(band: &Band, unit: f64) -> String {
    let [low, nominal, high] = self::band(band, unit);
    if band.low.is_some() || band.high.is_some() {
        format!("{nominal}  ({low} to {high})")
    } else {
        nominal
    }
}

/// A percentage without needless digits.
pub fn percent(share: f64) -> String {
    if !share.is_finite() {
        "–".to_owned()
    } else if share.abs() >= 0.0995 {
        format!("{:.0} %", share * 100.0)
    } else {
        format!("{:.2} %", share * 100.0)
    }
}

/// The inverse of a resistance band: the smaller and the larger conductance, W/K.
///
/// None where the resistance is not positive: no finite conductance belongs to it.
pub fn inverse(resistance: &Band) -> [Option<f64>; 3] {
    let of = |value: f64| (value > 0.0 && value.is_finite()).then(|| 1.0 / value);
    [
        resistance.high.and_then(of),
        of(resistance.nominal),
        resistance.low.and_then(of),
    ]
}

/// Text from a file made safe for a terminal: control characters become spaces.
pub fn plain(text: &str) -> String {
    text.chars()
        .map(|letter| if letter.is_control() { ' ' } else { letter })
        .collect()
}

/// The text on lines of at most `width` characters; lines after the first are indented.
///
/// A word longer than a line stands alone, uncut, because it may be a name to copy.
pub fn wrapped(text: &str, width: usize, indent: usize) -> String {
    let mut lines = String::new();
    let mut column = 0;
    for word in text.split_whitespace() {
        let length = word.chars().count();
        if column > indent && column + 1 + length > width {
            lines.push('\n');
            lines.push_str(&" ".repeat(indent));
            column = indent;
        } else if column > 0 {
            lines.push(' ');
            column += 1;
        }
        lines.push_str(word);
        column += length;
    }
    lines
}

/// The text on one line of at most `width` characters, with `…` where the rest is cut off.
pub fn cut(text: &str, width: usize) -> String {
    if text.chars().count() <= width {
        return text.to_owned();
    }
    let kept: String = text.chars().take(width.saturating_sub(1)).collect();
    // A half word reads as another word; one long word has no better place to end.
    let kept = kept
        .rsplit_once(' ')
        .map_or(kept.as_str(), |(whole, _)| whole);
    format!("{kept}…")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_number_carries_four_significant_digits() {
        for (value, shown) in [
            (0.0, "0"),
            (0.278_12, "0.2781"),
            (12345.6, "12350"),
            (9999.6, "10000"),
            (0.99996, "1.000"),
            (-2.71234, "-2.712"),
            (0.000_123_456, "0.0001235"),
            (0.000_012_345_6, "1.235e-5"),
            (1.5e7, "1.500e7"),
            (f64::NAN, "–"),
            (f64::INFINITY, "–"),
        ] {
            assert_eq!(four(value), shown, "{value}");
        }
    }

    #[test]
    fn round_values_print_without_zeros() {
        for (value, shown) in [
            (167.0, "167"),
            (0.2, "0.2"),
            (1200.0, "1200"),
            (2.54, "2.54"),
        ] {
            assert_eq!(brief(value), shown);
        }
    }

    #[test]
    fn the_larger_resistance_is_the_smaller_conductance() {
        let resistance = Band {
            low: Some(0.2),
            nominal: 0.25,
            high: Some(0.5),
        };
        assert_eq!(inverse(&resistance), [Some(2.0), Some(4.0), Some(5.0)]);
        let nothing = Band {
            low: Some(-1e-9),
            nominal: 0.0,
            high: None,
        };
        assert_eq!(inverse(&nothing), [None; 3]);
    }

    #[test]
    fn wrapped_text_keeps_every_word_and_stays_within_the_width() {
        let text = "the force of a bolt spreads into the plates under its head";
        let lines = wrapped(text, 20, 4);
        assert!(lines.lines().all(|line| line.chars().count() <= 20));
        assert_eq!(lines.split_whitespace().count(), 12);
        assert!(lines.lines().skip(1).all(|line| line.starts_with("    ")));
    }

    #[test]
    fn cut_text_ends_at_a_word_within_the_width() {
        assert_eq!(cut("short", 5), "short");
        assert_eq!(cut("force of a bolt", 10), "force of…");
        assert_eq!(cut("µµµµµµµµ", 4), "µµµ…");
    }

    #[test]
    fn escape_sequences_do_not_reach_the_terminal() {
        assert_eq!(plain("a\u{1b}[31mb\r\n"), "a [31mb  ");
    }
}
