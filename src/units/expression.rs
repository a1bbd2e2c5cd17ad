//! Products and quotients of unit symbols, such as `Btu·in/(h·ft²·°F)`.

use std::{iter::Peekable, str::Chars};

use crate::units::{
    dimension::{Dimension, NONE},
    symbols,
};

/// Size in SI and dimension of a unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Measure {
    /// Size in SI.
    pub size: f64,
    /// What it measures.
    pub dimension: Dimension,
}

/// What `lb` and `oz` stand for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Reading {
    /// Their weight.
    Force,
    /// Their mass.
    Mass,
}

/// Why a unit cannot be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum UnitError {
    /// A word that is no symbol.
    Unknown(String),
    /// A `·` or a space after a `/`: what follows could be above or below the bar.
    Ambiguous,
    /// A power that no quantity has.
    Power,
    /// A number inside the unit.
    Number(String),
    /// A sign that has no place in a unit.
    Sign(char),
    /// Something is missing: a symbol, a bracket.
    Incomplete,
}

/// Where a symbol stands.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Side {
    Above,
    Below,
}

#[derive(Clone, Debug, PartialEq)]
enum Token {
    Word(String),
    Power(i32),
    One,
    Times,
    Slash,
    Open,
    Close,
}

/// Largest power that may be written.
const LARGEST_WRITTEN_POWER: i32 = 9;
/// Deepest nesting of brackets; no unit in use needs two.
const DEEPEST: usize = 4;

/// Reads a unit.
pub(super) fn evaluate(text: &str, reading: Reading) -> Result<Measure, UnitError> {
    let mut tokens = tokens(text)?;
    if tokens.first() == Some(&Token::Slash) {
        // `/K` is the engineer's `1/K`.
        tokens.insert(0, Token::One);
    }
    let mut reader = Reader {
        tokens: &tokens,
        at: 0,
        reading,
    };
    let measure = reader.quotient(Side::Above, 0)?;
    match reader.next() {
        None => Ok(measure),
        Some(Token::Close) => Err(UnitError::Sign(')')),
        Some(_) => Err(UnitError::Incomplete),
    }
}

struct Reader<'a> {
    tokens: &'a [Token],
    at: usize,
    reading: Reading,
}

impl Reader<'_> {
    fn peek(&self) -> Option<&Token> {
        self.tokens.get(self.at)
    }

    fn next(&mut self) -> Option<&Token> {
        self.at += 1;
        self.tokens.get(self.at - 1)
    }

    /// Terms joined by `·` and `/`; a `·` after a `/` is refused, since people read it both ways.
    fn quotient(&mut self, side: Side, depth: usize) -> Result<Measure, UnitError> {
        let mut product = self.term(side, depth)?;
        let mut divided = false;
        loop {
            match self.peek() {
                Some(Token::Times) if divided => return Err(UnitError::Ambiguous),
                Some(Token::Times) => {
                    self.at += 1;
                    product = product.times(self.term(side, depth)?, 1)?;
                }
                Some(Token::Slash) => {
                    self.at += 1;
                    divided = true;
                    product = product.times(self.term(Side::Below, depth)?, -1)?;
                }
                _ => return Ok(product),
            }
        }
    }

    /// Factors with no sign between them: the `m²K` of `W/m²K`.
    fn term(&mut self, side: Side, depth: usize) -> Result<Measure, UnitError> {
        let mut product = self.factor(side, depth)?;
        while matches!(self.peek(), Some(Token::Word(_) | Token::Open | Token::One)) {
            product = product.times(self.factor(side, depth)?, 1)?;
        }
        Ok(product)
    }

    /// A symbol or a bracket, with its power.
    fn factor(&mut self, side: Side, depth: usize) -> Result<Measure, UnitError> {
        let base = match self.next() {
            Some(Token::Word(word)) => {
                let word = word.clone();
                self.symbol(&word, side)?
            }
            Some(Token::One) => Measure {
                size: 1.0,
                dimension: NONE,
            },
            Some(Token::Open) if depth < DEEPEST => {
                let inner = self.quotient(side, depth + 1)?;
                match self.next() {
                    Some(Token::Close) => inner,
                    _ => return Err(UnitError::Incomplete),
                }
            }
            Some(Token::Close) => return Err(UnitError::Sign(')')),
            _ => return Err(UnitError::Incomplete),
        };
        match self.peek() {
            Some(&Token::Power(power)) => {
                self.at += 1;
                let one = Measure {
                    size: 1.0,
                    dimension: NONE,
                };
                one.times(base, power)
            }
            _ => Ok(base),
        }
    }

    fn symbol(&self, word: &str, side: Side) -> Result<Measure, UnitError> {
        let product = match side {
            Side::Below => symbols::unit_below_the_bar(word),
            Side::Above => None,
        };
        let weight = symbols::force_or_mass(word).map(|(force, mass)| match self.reading {
            Reading::Force => force,
            Reading::Mass => mass,
        });
        product
            .or(weight)
            .or_else(|| symbols::unit(word))
            .map(|(size, dimension)| Measure { size, dimension })
            .ok_or_else(|| UnitError::Unknown(word.to_owned()))
    }
}

impl Measure {
    fn times(self, other: Self, power: i32) -> Result<Self, UnitError> {
        Ok(Self {
            size: self.size * other.size.powi(power),
            dimension: self
                .dimension
                .times(other.dimension, power)
                .ok_or(UnitError::Power)?,
        })
    }
}

/// Cuts a unit into tokens. A space between two factors is a product, elsewhere it is nothing.
fn tokens(text: &str) -> Result<Vec<Token>, UnitError> {
    let mut tokens = Vec::new();
    let mut spaced = false;
    let mut rest = text.chars().peekable();
    while let Some(next) = rest.next() {
        if next.is_whitespace() {
            spaced = true;
            continue;
        }
        let after_factor = matches!(
            tokens.last(),
            Some(Token::Word(_) | Token::Power(_) | Token::Close | Token::One)
        );
        let token = match next {
            '·' | '⋅' | '∙' | '*' | '×' | '.' => Token::Times,
            '-' | '−' | '‑' if after_factor && !spaced => match rest.peek() {
                Some(digit) if digit.is_ascii_digit() => Token::Power(power(&mut rest, next)?),
                _ => Token::Times,
            },
            '/' | '∕' | '⁄' => Token::Slash,
            '(' => Token::Open,
            ')' => Token::Close,
            '^' => match rest.next() {
                Some(first) => Token::Power(power(&mut rest, first)?),
                None => return Err(UnitError::Incomplete),
            },
            _ if raised(next).is_some() => Token::Power(power(&mut rest, next)?),
            '0'..='9' if after_factor && !spaced => Token::Power(power(&mut rest, next)?),
            '0'..='9' => one(&mut rest, next)?,
            _ if in_word(next) => Token::Word(word(&mut rest, next)),
            _ => return Err(UnitError::Sign(next)),
        };
        let starts_factor = matches!(token, Token::Word(_) | Token::Open | Token::One);
        if spaced && after_factor && starts_factor {
            tokens.push(Token::Times);
        }
        spaced = false;
        tokens.push(token);
    }
    Ok(tokens)
}

fn in_word(sign: char) -> bool {
    sign.is_alphabetic() || matches!(sign, '°' | 'º' | '%' | '℃' | '℉')
}

/// The rest of a word whose first sign has been taken, in the spelling of the symbol table.
fn word(rest: &mut Peekable<Chars>, first: char) -> String {
    let mut word = String::new();
    let mut next = Some(first);
    while let Some(sign) = next {
        match sign {
            'μ' => word.push('µ'),
            'º' => word.push('°'),
            '℃' => word.push_str("°C"),
            '℉' => word.push_str("°F"),
            _ => word.push(sign),
        }
        // A degree sign opens a word of its own: `m°C` is a metre and a degree.
        next = rest.next_if(|&sign| in_word(sign) && !matches!(sign, '°' | 'º' | '℃' | '℉'));
    }
    word
}

/// The only number that may stand in a unit is the one of `1/K`.
fn one(rest: &mut Peekable<Chars>, first: char) -> Result<Token, UnitError> {
    let mut digits = String::from(first);
    while let Some(digit) = rest.next_if(|sign| sign.is_ascii_digit() || *sign == '.') {
        digits.push(digit);
    }
    if digits == "1" {
        Ok(Token::One)
    } else {
        Err(UnitError::Number(digits))
    }
}

/// A power, plain or raised, from its first sign on.
fn power(rest: &mut Peekable<Chars>, first: char) -> Result<i32, UnitError> {
    let mut negative = false;
    let mut power: Option<i32> = None;
    let mut next = Some(first);
    while let Some(sign) = next {
        match raised(sign).unwrap_or(sign) {
            '-' | '−' | '‑' if power.is_none() && !negative => negative = true,
            '+' if power.is_none() && !negative => {}
            digit => {
                let digit = digit.to_digit(10).ok_or(UnitError::Incomplete)? as i32;
                let value = power.unwrap_or(0) * 10 + digit;
                if value > LARGEST_WRITTEN_POWER {
                    return Err(UnitError::Power);
                }
                power = Some(value);
            }
        }
        let started = power.is_some();
        next = rest.next_if(|&sign| {
            sign.is_ascii_digit() || raised(sign).is_some() || (!started && sign == '-')
        });
    }
    match power {
        Some(power) if negative => Ok(-power),
        Some(power) => Ok(power),
        None => Err(UnitError::Incomplete),
    }
}

/// The plain sign of a raised one.
fn raised(sign: char) -> Option<char> {
    Some(match sign {
        '⁰' => '0',
        '¹' => '1',
        '²' => '2',
        '³' => '3',
        '⁴' => '4',
        '⁵' => '5',
        '⁶' => '6',
        '⁷' => '7',
        '⁸' => '8',
        '⁹' => '9',
        '⁻' => '-',
        '⁺' => '+',
        _ => return None,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(text: &str) -> Result<Measure, UnitError> {
        evaluate(text, Reading::Force)
    }

    #[test]
    fn spellings_of_one_unit_read_alike() {
        let conductivity = read("W/(m·K)").unwrap();
        for text in [
            "W/(m K)",
            "W/mK",
            "W/m/K",
            "W·m^-1·K^-1",
            "W m⁻¹ K⁻¹",
            "W m-1 K-1",
            "W/(m*K)",
            " W / ( m · K ) ",
            "W/(mK)",
            "W/m°C",
        ] {
            assert_eq!(read(text), Ok(conductivity), "{text}");
        }
    }

    #[test]
    fn a_product_after_a_bar_is_refused() {
        for text in ["W/cm·K", "W/m K", "K/W·m²", "W/m*K"] {
            assert_eq!(read(text), Err(UnitError::Ambiguous), "{text}");
        }
    }

    #[test]
    fn deep_brackets_and_runaway_powers_are_refused() {
        assert_eq!(read("((((((m))))))"), Err(UnitError::Incomplete));
        assert_eq!(read("m^10"), Err(UnitError::Power));
        assert_eq!(read("((m^9)^9)"), Err(UnitError::Power));
        assert_eq!(read("m^99999999999999"), Err(UnitError::Power));
    }

    #[test]
    fn the_pound_is_a_force_or_a_mass() {
        let force = evaluate("lb", Reading::Force).unwrap();
        let mass = evaluate("lb", Reading::Mass).unwrap();
        // The ratio is the standard free fall by definition.
        assert!((force.size / mass.size - 9.80665).abs() < 1e-12);
    }
}
