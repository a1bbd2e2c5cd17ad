//! The unit symbols that are known, each with its size in SI.

use crate::units::dimension::{
    ANGLE, Dimension, ENERGY, FORCE, LENGTH, MASS, NONE, POWER, PRESSURE, TEMPERATURE, TIME,
};

/// A unit: its size in SI and what it measures.
pub(super) type Unit = (f64, Dimension);

/// Standard acceleration of free fall, m/s²; exact by definition (CGPM 1901).
const FREE_FALL: f64 = 9.80665;
/// International inch, m; exact by definition (1959).
pub(super) const INCH: f64 = 0.0254;
/// International pound, kg; exact by definition (1959).
pub(super) const POUND: f64 = 0.453_592_37;
/// Pound-force, N; exact, from the two above.
pub(super) const POUND_FORCE: f64 = POUND * FREE_FALL;
/// Standard atmosphere, Pa; exact by definition (CGPM 1954).
const ATMOSPHERE: f64 = 101_325.0;
/// Pound-force per square inch, Pa; exact, from the definitions above.
pub(super) const PSI: f64 = POUND_FORCE / (INCH * INCH);
/// Millionth of an inch, m; exact.
pub(super) const MICROINCH: f64 = 1e-6 * INCH;
/// Inch times pound-force, N m; exact.
pub(super) const INCH_POUND: f64 = INCH * POUND_FORCE;
/// Foot times pound-force, N m; exact.
pub(super) const FOOT_POUND: f64 = 12.0 * INCH_POUND;
/// International table British thermal unit, J; exact, from 4.1868 J/(g K) by definition.
const BTU: f64 = 4186.8 * POUND * 5.0 / 9.0;
/// Btu per hour, square foot and degree Fahrenheit, W/(m² K); exact.
pub(super) const BTU_PER_FOOT: f64 = BTU / 3600.0 / (144.0 * INCH * INCH) * 1.8;
/// International table calorie, J; exact by definition (1956).
const CALORIE: f64 = 4.1868;
/// Celsius zero, K; exact by definition of the scale.
pub(super) const CELSIUS_ZERO: f64 = 273.15;
/// Fahrenheit zero above absolute zero, in Fahrenheit degrees; exact by definition of the scale.
pub(super) const FAHRENHEIT_ZERO: f64 = 459.67;
/// One degree of arc, rad.
const DEGREE: f64 = std::f64::consts::PI / 180.0;

/// Every symbol. Prefixed ones are listed one by one, so that `Mm` for `mm` is not a length.
const SYMBOLS: &[(&str, Unit)] = &[
    ("m", (1.0, LENGTH)),
    ("km", (1e3, LENGTH)),
    ("cm", (1e-2, LENGTH)),
    ("mm", (1e-3, LENGTH)),
    ("µm", (1e-6, LENGTH)),
    ("um", (1e-6, LENGTH)),
    ("nm", (1e-9, LENGTH)),
    ("in", (INCH, LENGTH)),
    ("inch", (INCH, LENGTH)),
    ("ft", (12.0 * INCH, LENGTH)),
    ("mil", (1e-3 * INCH, LENGTH)),
    ("mils", (1e-3 * INCH, LENGTH)),
    ("thou", (1e-3 * INCH, LENGTH)),
    ("µin", (1e-6 * INCH, LENGTH)),
    ("uin", (1e-6 * INCH, LENGTH)),
    ("N", (1.0, FORCE)),
    ("mN", (1e-3, FORCE)),
    ("daN", (10.0, FORCE)),
    ("kN", (1e3, FORCE)),
    ("MN", (1e6, FORCE)),
    ("gf", (1e-3 * FREE_FALL, FORCE)),
    ("kgf", (FREE_FALL, FORCE)),
    ("ozf", (POUND_FORCE / 16.0, FORCE)),
    ("lbf", (POUND_FORCE, FORCE)),
    ("klbf", (1e3 * POUND_FORCE, FORCE)),
    ("kip", (1e3 * POUND_FORCE, FORCE)),
    ("Nm", (1.0, ENERGY)),
    ("Ncm", (1e-2, ENERGY)),
    ("Nmm", (1e-3, ENERGY)),
    ("mNm", (1e-3, ENERGY)),
    ("cNm", (1e-2, ENERGY)),
    ("kNm", (1e3, ENERGY)),
    ("inlb", (INCH * POUND_FORCE, ENERGY)),
    ("inlbf", (INCH * POUND_FORCE, ENERGY)),
    ("ftlb", (12.0 * INCH * POUND_FORCE, ENERGY)),
    ("ftlbf", (12.0 * INCH * POUND_FORCE, ENERGY)),
    ("ozin", (INCH * POUND_FORCE / 16.0, ENERGY)),
    ("J", (1.0, ENERGY)),
    ("kJ", (1e3, ENERGY)),
    ("Btu", (BTU, ENERGY)),
    ("BTU", (BTU, ENERGY)),
    ("cal", (CALORIE, ENERGY)),
    ("kcal", (1e3 * CALORIE, ENERGY)),
    ("Pa", (1.0, PRESSURE)),
    ("mPa", (1e-3, PRESSURE)),
    ("µPa", (1e-6, PRESSURE)),
    ("hPa", (1e2, PRESSURE)),
    ("kPa", (1e3, PRESSURE)),
    ("MPa", (1e6, PRESSURE)),
    ("GPa", (1e9, PRESSURE)),
    ("bar", (1e5, PRESSURE)),
    ("mbar", (1e2, PRESSURE)),
    ("atm", (ATMOSPHERE, PRESSURE)),
    ("psi", (PSI, PRESSURE)),
    ("ksi", (1e3 * PSI, PRESSURE)),
    ("Mpsi", (1e6 * PSI, PRESSURE)),
    ("Msi", (1e6 * PSI, PRESSURE)),
    ("Torr", (ATMOSPHERE / 760.0, PRESSURE)),
    ("torr", (ATMOSPHERE / 760.0, PRESSURE)),
    ("mTorr", (1e-3 * ATMOSPHERE / 760.0, PRESSURE)),
    ("mtorr", (1e-3 * ATMOSPHERE / 760.0, PRESSURE)),
    ("K", (1.0, TEMPERATURE)),
    ("mK", (1e-3, TEMPERATURE)),
    ("°C", (1.0, TEMPERATURE)),
    ("degC", (1.0, TEMPERATURE)),
    ("°F", (5.0 / 9.0, TEMPERATURE)),
    ("degF", (5.0 / 9.0, TEMPERATURE)),
    ("W", (1.0, POWER)),
    ("µW", (1e-6, POWER)),
    ("mW", (1e-3, POWER)),
    ("kW", (1e3, POWER)),
    ("MW", (1e6, POWER)),
    ("kg", (1.0, MASS)),
    ("g", (1e-3, MASS)),
    ("mg", (1e-6, MASS)),
    ("s", (1.0, TIME)),
    ("min", (60.0, TIME)),
    ("h", (3600.0, TIME)),
    ("hr", (3600.0, TIME)),
    ("°", (DEGREE, ANGLE)),
    ("deg", (DEGREE, ANGLE)),
    ("rad", (1.0, ANGLE)),
    ("mrad", (1e-3, ANGLE)),
    ("%", (1e-2, NONE)),
    ("ppm", (1e-6, NONE)),
];

/// The two readings of the pound and the ounce: as a force, as a mass.
const TWO_READINGS: &[(&str, Unit, Unit)] = &[
    ("lb", (POUND_FORCE, FORCE), (POUND, MASS)),
    ("oz", (POUND_FORCE / 16.0, FORCE), (POUND / 16.0, MASS)),
];

/// Words that are read as a product below a fraction bar, where the trade never means a millikelvin.
const BELOW_THE_BAR: &[(&str, Unit)] = &[
    ("mK", (1.0, Dimension([1, 0, 0, 1, 0]))),
    ("cmK", (1e-2, Dimension([1, 0, 0, 1, 0]))),
];

/// The unit of a symbol that has one meaning everywhere.
pub(super) fn unit(symbol: &str) -> Option<Unit> {
    find(SYMBOLS, symbol)
}

/// The unit of a symbol that stands for a product when it is below the fraction bar.
pub(super) fn unit_below_the_bar(symbol: &str) -> Option<Unit> {
    find(BELOW_THE_BAR, symbol)
}

/// The force and the mass that `lb` and `oz` may mean.
pub(super) fn force_or_mass(symbol: &str) -> Option<(Unit, Unit)> {
    TWO_READINGS
        .iter()
        .find(|(name, _, _)| *name == symbol)
        .map(|&(_, force, mass)| (force, mass))
}

/// How far absolute zero lies below the zero of the scale that `unit` names, in its own degrees;
/// none when the text is not the symbol of one scale alone.
pub(super) fn zero_of_scale(unit: &str) -> Option<f64> {
    match unit.trim() {
        "K" | "mK" => Some(0.0),
        "°C" | "degC" | "℃" => Some(CELSIUS_ZERO),
        "°F" | "degF" | "℉" => Some(FAHRENHEIT_ZERO),
        _ => None,
    }
}

/// The known symbols that differ from `word` in upper and lower case alone.
pub(super) fn same_but_for_case(word: &str) -> impl Iterator<Item = (&'static str, Unit)> {
    let word = word.to_lowercase();
    SYMBOLS
        .iter()
        .copied()
        .filter(move |(symbol, _)| symbol.to_lowercase() == word)
}

fn find(table: &[(&str, Unit)], symbol: &str) -> Option<Unit> {
    table
        .iter()
        .find(|(name, _)| *name == symbol)
        .map(|&(_, unit)| unit)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_symbol_stands_once() {
        for (at, (symbol, _)) in SYMBOLS.iter().enumerate() {
            assert!(
                SYMBOLS[at + 1..].iter().all(|(other, _)| other != symbol),
                "{symbol}"
            );
            assert!(force_or_mass(symbol).is_none(), "{symbol}");
        }
    }

    #[test]
    fn imperial_units_have_their_published_size() {
        // NIST SP 811, appendix B.8, prints these to seven figures.
        for (symbol, printed) in [
            ("lbf", 4.448222),
            ("psi", 6894.757),
            ("Torr", 133.3224),
            ("Btu", 1055.056),
        ] {
            let (size, _) = unit(symbol).unwrap();
            assert!((size / printed - 1.0).abs() < 1e-6, "{symbol} {size}");
        }
    }
}
