//! The number at the start of a quantity.

use crate::units::{Quantity, UnitFault, fix};

/// Splits `"<number> <unit>"`; the unit may be empty.
pub(super) fn split(text: &str, quantity: Quantity) -> Result<(f64, &str), UnitFault> {
    let digits = mantissa(text);
    if !text[..digits].contains(|sign: char| sign.is_ascii_digit()) {
        return Err(no_number(text, quantity));
    }
    let end = digits + exponent(&text[digits..]);
    let rest = &text[end..];
    grouped(text, end, quantity)?;
    if let Some((value, rest)) = fraction(&text[..end], rest) {
        return Ok((value, rest.trim()));
    }
    let number: f64 = text[..end]
        .replace('−', "-")
        .parse()
        .map_err(|_| no_number(text, quantity))?;
    if !number.is_finite() {
        return Err(UnitFault::new(
            format!("{} is too large to reckon with", fix::quoted(text)),
            fix::such_as(quantity),
        ));
    }
    Ok((number, rest.trim()))
}

/// Bytes of sign, digits and decimal point at the start.
fn mantissa(text: &str) -> usize {
    let mut point = false;
    for (at, sign) in text.char_indices() {
        let belongs = match sign {
            '+' | '-' | '−' => at == 0,
            '.' => !std::mem::replace(&mut point, true),
            _ => sign.is_ascii_digit(),
        };
        if !belongs {
            return at;
        }
    }
    text.len()
}

/// Bytes of a power of ten such as `e-6`, none when an `e` is followed by something else.
fn exponent(text: &str) -> usize {
    let Some(after) = text.strip_prefix(['e', 'E']) else {
        return 0;
    };
    let unsigned = after.trim_start_matches(['+', '-', '−']);
    let signs = after[..after.len() - unsigned.len()].chars().count();
    let digits = unsigned.len()
        - unsigned
            .trim_start_matches(|d: char| d.is_ascii_digit())
            .len();
    if signs > 1 || digits == 0 {
        return 0;
    }
    text.len() - unsigned.len() + digits
}

/// The value of a whole fraction such as `1/4`, and what follows it.
fn fraction<'a>(above: &str, rest: &'a str) -> Option<(f64, &'a str)> {
    if !above.bytes().all(|byte| byte.is_ascii_digit()) {
        return None;
    }
    let below = rest.strip_prefix('/')?;
    let after = below.trim_start_matches(|digit: char| digit.is_ascii_digit());
    let below: f64 = below[..below.len() - after.len()].parse().ok()?;
    let value = above.parse::<f64>().ok()? / below;
    value.is_finite().then_some((value, after))
}

/// Refuses a decimal comma, grouped digits, a range and a power of ten written out.
fn grouped(text: &str, end: usize, quantity: Quantity) -> Result<(), UnitFault> {
    let (number, rest) = text.split_at(end);
    let mut signs = rest.chars();
    let first = signs.next();
    let digit_follows = signs.next().is_some_and(|sign| sign.is_ascii_digit());
    let found = fix::quoted(text);
    match first {
        Some(',') => {
            let after = rest[1..].trim_start();
            let whole = number.contains('.') || !digit_follows;
            let digits = after.len() - after.trim_start_matches(|d: char| d.is_ascii_digit()).len();
            let help = if whole {
                fix::such_as(quantity)
            } else if digits == 3 {
                let (one, unit) = after.split_at(digits);
                format!("write `{number}.{one}{unit}`, or `{number}{one}{unit}` for thousands")
            } else {
                format!("write `{number}.{after}`")
            };
            Err(UnitFault::new(
                format!("{found} has a comma in its number; the decimal sign is a point"),
                help,
            ))
        }
        Some('_' | '\'' | '’') if digit_follows => Err(UnitFault::new(
            format!("{found} has grouped digits"),
            "write the digits without a sign between them".to_owned(),
        )),
        _ => spaced(text, rest.trim_start(), quantity),
    }
}

/// Refuses what may follow a number after a space and is no unit.
fn spaced(text: &str, rest: &str, quantity: Quantity) -> Result<(), UnitFault> {
    let found = fix::quoted(text);
    let mut signs = rest.chars();
    let first = signs.next();
    let after = signs.as_str().trim_start();
    match first {
        Some('±' | '+' | '…' | '~' | '–' | '—') => Err(one_value(&found, quantity)),
        Some('-' | '.') if after.starts_with(|sign: char| sign.is_ascii_digit() || sign == '.') => {
            Err(one_value(&found, quantity))
        }
        Some('×' | 'x' | '·' | '*') if after.starts_with("10") => Err(UnitFault::new(
            format!("{found} writes out its power of ten"),
            format!("write it with an `e`, such as `1.2e-4 {}`", quantity.unit()),
        )),
        Some('0'..='9') if !rest.starts_with("1/") && !rest.starts_with("1 /") => {
            Err(UnitFault::new(
                format!("{found} holds two numbers"),
                "write one number without spaces, then the unit".to_owned(),
            ))
        }
        _ => Ok(()),
    }
}

fn one_value(found: &str, quantity: Quantity) -> UnitFault {
    UnitFault::new(
        format!("{found} holds more than one number; one value is expected"),
        format!("write one value such as `{}`", quantity.example()),
    )
}

fn no_number(text: &str, quantity: Quantity) -> UnitFault {
    let found = fix::quoted(text);
    let lower = text.trim_start_matches(['+', '-', '−']).to_lowercase();
    if text.is_empty() {
        return UnitFault::new(
            format!(
                "{} is expected, and the text is empty",
                quantity.with_article()
            ),
            fix::such_as(quantity),
        );
    }
    if lower.starts_with("inf") || lower.starts_with("nan") || lower.starts_with('∞') {
        return UnitFault::new(
            format!("{found} is not a finite number"),
            fix::such_as(quantity),
        );
    }
    let size = text.strip_prefix('M').unwrap_or_default();
    let thread = size.starts_with(|sign: char| sign.is_ascii_digit());
    if quantity == Quantity::Length && thread && size.parse::<f64>().is_ok() {
        return UnitFault::new(
            format!("{found} is a thread, and a length is expected"),
            format!("write `{size} mm` for its nominal diameter"),
        );
    }
    if let Some(diameter) = text.strip_prefix(['Ø', 'ø', '⌀']) {
        return UnitFault::new(
            format!("{found} carries a diameter sign"),
            format!("write {}", fix::quoted(diameter.trim())),
        );
    }
    UnitFault::new(
        format!(
            "{found} does not start with a number; {} is expected",
            quantity.with_article()
        ),
        fix::such_as(quantity),
    )
}
