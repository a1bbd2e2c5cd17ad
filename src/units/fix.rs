//! The words of the faults: what was found, and the text that would be right.

use crate::units::{
    Quantity, UnitFault,
    dimension::{ACCELERATION, Dimension},
    expression::UnitError,
    symbols,
};

/// Longest piece of the user's text repeated in a message, characters.
const LONGEST_QUOTE: usize = 40;

/// The user's text in backquotes, cut to a length that fits a line and without control signs.
pub(super) fn quoted(text: &str) -> String {
    let mut quote: String = text
        .chars()
        .take(LONGEST_QUOTE)
        .map(|sign| {
            if sign.is_control() || sign == '`' {
                ' '
            } else {
                sign
            }
        })
        .collect();
    if text.chars().nth(LONGEST_QUOTE).is_some() {
        quote.push('…');
    }
    format!("`{quote}`")
}

/// A noun with its article.
pub(super) fn with_article(noun: &str) -> String {
    let article = if noun.starts_with(['a', 'e', 'i', 'o', 'u']) {
        "an"
    } else {
        "a"
    };
    format!("{article} {noun}")
}

/// An example of the quantity as a help text.
pub(super) fn such_as(quantity: Quantity) -> String {
    format!(
        "write {} such as `{}`",
        quantity.with_article(),
        quantity.example()
    )
}

/// A number without a unit.
pub(super) fn bare(text: &str, quantity: Quantity) -> UnitFault {
    UnitFault::new(
        format!(
            "{} has no unit; {} is expected",
            quoted(text),
            quantity.with_article()
        ),
        format!(
            "write the unit with it, such as `{text} {}`",
            quantity.usual_unit()
        ),
    )
}

/// A unit of something else.
pub(super) fn wrong_dimension(text: &str, quantity: Quantity, found: Dimension) -> UnitFault {
    let expected = quantity.with_article();
    let message = match found.name() {
        Some(name) => format!(
            "{} is {}, and {expected} is expected",
            quoted(text),
            with_article(name)
        ),
        None => format!("{} does not measure {expected}", quoted(text)),
    };
    let is_mass = found.times(ACCELERATION, 1) == Some(Dimension::of(quantity));
    let help = match quantity {
        _ if is_mass => "a kilogram is a mass; its weight is written `kgf`".to_owned(),
        Quantity::Torque if text.ends_with("nm") => {
            format!(
                "newton metre is written `{}N·m`",
                text.trim_end_matches("nm")
            )
        }
        Quantity::Force if text.ends_with("kg") => "a weight is written `kgf`".to_owned(),
        Quantity::Ratio if found == Dimension::of(Quantity::Angle) => {
            "write a percentage such as `5 %`".to_owned()
        }
        _ => such_as(quantity),
    };
    UnitFault::new(message, help)
}

/// A unit that cannot be read.
pub(super) fn unreadable(text: &str, quantity: Quantity, error: &UnitError) -> UnitFault {
    let found = quoted(text);
    let expected = quantity.with_article();
    let (message, help) = match error {
        UnitError::Unknown(word) => (
            format!("{} is not a unit; {expected} is expected", quoted(word)),
            meant(text, word, quantity).unwrap_or_else(|| such_as(quantity)),
        ),
        UnitError::Ambiguous => (
            format!("{found} can be read two ways: is the last factor above or below the bar?"),
            format!(
                "put what is below the bar in brackets, such as `{}`",
                bracketed(text).unwrap_or_else(|| quantity.example().to_owned())
            ),
        ),
        UnitError::Power => (
            format!("{found} holds a power that no quantity has"),
            such_as(quantity),
        ),
        UnitError::Number(number) => (
            format!(
                "{found} holds the number {} inside its unit",
                quoted(number)
            ),
            such_as(quantity),
        ),
        UnitError::Sign('"' | '″' | '”') => (
            format!("{found} uses a double quote for inches"),
            "write `in`, such as `0.25 in`".to_owned(),
        ),
        UnitError::Sign('\'' | '′' | '’') => (
            format!("{found} uses a quote as a unit"),
            "write `ft` for feet, or an angle in decimal degrees such as `30.5 °`".to_owned(),
        ),
        UnitError::Sign(sign) => (
            format!(
                "{found} holds the sign {} where a unit should be",
                quoted(&sign.to_string())
            ),
            such_as(quantity),
        ),
        UnitError::Incomplete => (
            format!("{found} holds an unfinished unit; {expected} is expected"),
            such_as(quantity),
        ),
    };
    UnitFault::new(message, help)
}

/// Words people write for a symbol, in lower case and without a plural `s`.
const SPELT_OUT: &[(&str, &str)] = &[
    ("micron", "µm"),
    ("micrometer", "µm"),
    ("micrometre", "µm"),
    ("millimeter", "mm"),
    ("millimetre", "mm"),
    ("centimeter", "cm"),
    ("centimetre", "cm"),
    ("meter", "m"),
    ("metre", "m"),
    ("inche", "in"),
    ("feet", "ft"),
    ("foot", "ft"),
    ("microinch", "µin"),
    ("lb", "lb"),
    ("pound", "lbf"),
    ("newton", "N"),
    ("kilonewton", "kN"),
    ("kp", "kgf"),
    ("pascal", "Pa"),
    ("psia", "psi"),
    ("bara", "bar"),
    ("watt", "W"),
    ("kelvin", "K"),
    ("celsiu", "°C"),
    ("fahrenheit", "°F"),
    ("degree", "°"),
    ("percent", "%"),
];

/// The help for a word that is nearly a symbol: its spelling in full, a scale without its degree
/// sign, or a slip of upper and lower case such as `mpa`.
fn meant(text: &str, word: &str, quantity: Quantity) -> Option<String> {
    let wanted = Dimension::of(quantity);
    let plain = word.to_lowercase();
    let plain = plain.strip_suffix('s').unwrap_or(&plain);
    if plain == "barg" || plain == "psig" {
        return Some("write the absolute pressure: gauge pressure plus 1.013 bar".to_owned());
    }
    let scale = matches!(word, "C" | "F" | "c" | "f");
    if scale && wanted == Dimension::of(Quantity::Temperature) {
        let letter = word.to_uppercase();
        let number = text.trim_end_matches(word).trim_end().trim_end_matches('°');
        return Some(format!(
            "write {}",
            quoted(&format!("{} °{letter}", number.trim_end()))
        ));
    }
    let spelt = SPELT_OUT.iter().find(|(spelt, _)| *spelt == plain);
    if let Some((_, symbol)) = spelt.filter(|(_, symbol)| *symbol != word) {
        return Some(format!("write {}", quoted(&text.replacen(word, symbol, 1))));
    }
    // What measures the right thing comes first; of `MPa` and `mPa` the larger is the likelier slip.
    let (symbol, _) = symbols::same_but_for_case(word).min_by(|(_, one), (_, other)| {
        (other.1 == wanted)
            .cmp(&(one.1 == wanted))
            .then(other.0.total_cmp(&one.0))
    })?;
    Some(format!(
        "upper and lower case count: write {}",
        quoted(&text.replacen(word, symbol, 1))
    ))
}

/// The text with everything after its first bar in brackets.
fn bracketed(text: &str) -> Option<String> {
    let (above, below) = text.split_once('/')?;
    let plain = !below.contains(['(', ')', '/']) && text.chars().count() <= LONGEST_QUOTE;
    plain.then(|| format!("{above}/({})", below.trim()))
}
