//! Units for people: which unit each kind of number is printed in, system by system.

use crate::units::symbols;

/// A system of units for what people read; programs read SI always.
///
/// The heat keeps W, and what follows from it K, K/W and W/K in all three: the trade gives thermal
/// resistances in °C/W also where lengths are in inches, and a kelvin is a degree Celsius there.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum System {
    /// SI with its prefixes: mm, µm, N·m, kN, `MPa`, °C.
    #[default]
    Si,
    /// As on metric shop floors: stress in N/mm², pressure of gas in bar, the rest as SI.
    Shop,
    /// Inch and pound: in, mil, in·lbf, lbf, psi, °F, Btu/(h·ft²·°F).
    Inch,
}

/// What a column of numbers tells; each has one unit in a system.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shown {
    /// Clamp force and loads.
    Force,
    /// Tightening torque.
    Torque,
    /// Contact pressure.
    Pressure,
    /// Pressure of a gas.
    GasPressure,
    /// Length along a plate.
    Length,
    /// Gap between faces.
    Gap,
    /// Area of a ring.
    Area,
    /// Local conductance.
    Conductance,
    /// Mass of fasteners.
    SmallMass,
    /// Mass of a joint.
    Mass,
}

/// A unit: its symbol and its size in SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Unit {
    /// Its symbol.
    pub name: &'static str,
    /// One of it in SI.
    pub size: f64,
}

impl Unit {
    /// A value in SI as a number of this unit.
    pub fn of(self, value: f64) -> f64 {
        value / self.size
    }
}

/// Torque from which a foot is the lever people speak of, N m: 20 ft·lbf.
const LONG_LEVER: f64 = 20.0 * symbols::FOOT_POUND;
/// Lengths below this are told in µin where they are small, m: 100 µin.
const FINE: f64 = 100.0 * symbols::MICROINCH;
/// Stresses from here are told in thousands, Pa: 10 ksi.
const HIGH: f64 = 1e4 * symbols::PSI;

/// What SI prints, with the size of each: the longest symbol first where one begins another.
const PRINTED: [(&str, f64); 24] = [
    ("W/(m²·K)", 1.0),
    ("W/(m·K)", 1.0),
    ("µm/(m·K)", 1e-6),
    ("K·cm²/W", 1e-4),
    ("kg/m³", 1.0),
    ("W/m²", 1.0),
    ("N·mm", 1e-3),
    ("N·m", 1.0),
    ("mm²", 1e-6),
    ("cm²", 1e-4),
    ("m²", 1.0),
    ("GPa", 1e9),
    ("MPa", 1e6),
    ("kPa", 1e3),
    ("Pa", 1.0),
    ("MN", 1e6),
    ("kN", 1e3),
    ("nm", 1e-9),
    ("µm", 1e-6),
    ("mm", 1e-3),
    ("kg", 1.0),
    ("°C", 1.0),
    ("N", 1.0),
    ("g", 1e-3),
];

impl System {
    /// The unit of a column.
    pub fn unit(self, shown: Shown) -> Unit {
        let (name, size) = match (self, shown) {
            (Self::Si, Shown::Pressure) => ("MPa", 1e6),
            (Self::Shop, Shown::Pressure) => ("N/mm²", 1e6),
            (Self::Si, Shown::GasPressure) => ("kPa", 1e3),
            (Self::Shop, Shown::GasPressure) => ("bar", 1e5),
            (Self::Si | Self::Shop, Shown::Force) => ("kN", 1e3),
            (Self::Si | Self::Shop, Shown::Torque) => ("N·m", 1.0),
            (Self::Si | Self::Shop, Shown::Length) => ("mm", 1e-3),
            (Self::Si | Self::Shop, Shown::Gap) => ("µm", 1e-6),
            (Self::Si | Self::Shop, Shown::Area) => ("mm²", 1e-6),
            (Self::Si | Self::Shop, Shown::Conductance) => ("W/(m²·K)", 1.0),
            (Self::Si | Self::Shop, Shown::SmallMass) => ("g", 1e-3),
            (Self::Si | Self::Shop, Shown::Mass) => ("kg", 1.0),
            (Self::Inch, Shown::Force) => ("lbf", symbols::POUND_FORCE),
            (Self::Inch, Shown::Torque) => ("in·lbf", symbols::INCH_POUND),
            (Self::Inch, Shown::Pressure | Shown::GasPressure) => ("psi", symbols::PSI),
            (Self::Inch, Shown::Length) => ("in", symbols::INCH),
            (Self::Inch, Shown::Gap) => ("mil", 1e3 * symbols::MICROINCH),
            (Self::Inch, Shown::Area) => ("in²", symbols::INCH * symbols::INCH),
            (Self::Inch, Shown::Conductance) => ("Btu/(h·ft²·°F)", symbols::BTU_PER_FOOT),
            (Self::Inch, Shown::SmallMass | Shown::Mass) => ("lb", symbols::POUND),
        };
        Unit { name, size }
    }

    /// A temperature in K on the scale of the system, and the symbol of the scale.
    pub fn temperature(self, kelvin: f64) -> (f64, &'static str) {
        match self {
            Self::Si | Self::Shop => (kelvin - symbols::CELSIUS_ZERO, "°C"),
            Self::Inch => (1.8 * kelvin - symbols::FAHRENHEIT_ZERO, "°F"),
        }
    }

    /// The unit in which this system tells `size` of what SI prints with a symbol; none where it
    /// tells the same.
    fn instead(self, symbol: &str, size: f64) -> Option<Unit> {
        let (name, size) = match self {
            Self::Si => return None,
            Self::Shop => match symbol {
                "GPa" => ("kN/mm²", 1e9),
                "MPa" => ("N/mm²", 1e6),
                "kPa" => ("bar", 1e5),
                "Pa" => ("mbar", 1e2),
                _ => return None,
            },
            Self::Inch => match symbol {
                "W/(m²·K)" => ("Btu/(h·ft²·°F)", symbols::BTU_PER_FOOT),
                "W/(m·K)" => (
                    "Btu/(h·ft·°F)",
                    12.0 * symbols::INCH * symbols::BTU_PER_FOOT,
                ),
                // The same change per degree Fahrenheit is five ninths of that per kelvin.
                "µm/(m·K)" => ("µin/(in·°F)", 1.8e-6),
                "K·cm²/W" => ("°C·in²/W", symbols::INCH * symbols::INCH),
                "kg/m³" => ("lb/in³", symbols::POUND / symbols::INCH.powi(3)),
                "W/m²" => ("W/in²", (symbols::INCH * symbols::INCH).recip()),
                "N·mm" | "N·m" if size < LONG_LEVER => ("in·lbf", symbols::INCH_POUND),
                "N·mm" | "N·m" => ("ft·lbf", symbols::FOOT_POUND),
                "mm²" | "cm²" | "m²" => ("in²", symbols::INCH * symbols::INCH),
                "GPa" => ("Msi", 1e6 * symbols::PSI),
                "MPa" if size >= HIGH => ("ksi", 1e3 * symbols::PSI),
                "MPa" | "kPa" | "Pa" => ("psi", symbols::PSI),
                "MN" | "kN" | "N" => ("lbf", symbols::POUND_FORCE),
                "nm" | "µm" if size < FINE => ("µin", symbols::MICROINCH),
                "nm" | "µm" => ("mil", 1e3 * symbols::MICROINCH),
                "mm" => ("in", symbols::INCH),
                "kg" | "g" => ("lb", symbols::POUND),
                _ => return None,
            },
        };
        Some(Unit { name, size })
    }

    /// A text for people with every number that SI prints a unit behind told in this system.
    ///
    /// `0.3 to 2 µm`, `12.3 (10 to 14) kN` and `x 12, y 30 mm` are one group of numbers with one
    /// unit. The last digit told counts no less than the last one that was printed; two digits are told at least
    /// and four at most. A number whose unit is not known is left as it stands, with its unit.
    ///
    /// ```
    /// use ringsum::units::System;
    /// assert_eq!(System::Inch.restated("a gap of 25.4 µm"), "a gap of 1.00 mil");
    /// assert_eq!(System::Shop.restated("80 MPa"), "80 N/mm²");
    /// ```
    pub fn restated(self, text: &str) -> String {
        if self == Self::Si {
            return text.to_owned();
        }
        let mut told = String::with_capacity(text.len());
        // Numbers that wait for their unit: where they stand in what is told.
        let mut group: Vec<(usize, usize)> = Vec::new();
        let mut rest = text;
        while let Some(first) = rest.chars().next() {
            let apart = told.chars().next_back().is_none_or(|before| {
                !(before.is_alphanumeric() || matches!(before, '.' | '_' | '/' | '-' | '·'))
            });
            let length = if apart { number(rest) } else { 0 };
            if length == 0 {
                let size = first.len_utf8();
                told.push_str(&rest[..size]);
                rest = &rest[size..];
                continue;
            }
            let joined = group.last().is_some_and(|&(_, end)| joins(&told[end..]));
            if !joined {
                group.clear();
            }
            group.push((told.len(), told.len() + length));
            told.push_str(&rest[..length]);
            rest = &rest[length..];
            let gap = rest.len() - rest.trim_start_matches([')', ' ', '\n']).len();
            let behind = &rest[gap..];
            let Some((symbol, size)) = PRINTED.iter().find(|(symbol, _)| stands(behind, symbol))
            else {
                continue;
            };
            let space = &rest[..gap];
            rest = &behind[symbol.len()..];
            let name = self.converted(&mut told, &group, (symbol, *size));
            told.push_str(space);
            told.push_str(name.unwrap_or(symbol));
            group.clear();
        }
        told
    }

    /// The same with names that users gave, which stand as they are: a `6 mm carrier` stays one.
    pub fn restated_around(self, text: &str, names: &[String]) -> String {
        let changed = |name: &&String| self.restated(name) != **name;
        let mut names: Vec<&String> = names.iter().filter(changed).collect();
        // A name within a longer one is part of that.
        names.sort_by_key(|name| std::cmp::Reverse(name.len()));
        let mut told = String::new();
        let mut rest = text;
        let alone = |letter: Option<char>| {
            letter.is_none_or(|letter| !letter.is_alphanumeric() && !".,-−".contains(letter))
        };
        'text: loop {
            for (at, _) in rest.char_indices() {
                let before = rest[..at].chars().next_back().or(told.chars().next_back());
                let found = names.iter().find(|name| {
                    let after = rest[at..].strip_prefix(name.as_str());
                    after.is_some_and(|after| alone(before) && alone(after.chars().next()))
                });
                if let Some(name) = found {
                    told.push_str(&self.restated(&rest[..at]));
                    told.push_str(name);
                    rest = &rest[at + name.len()..];
                    continue 'text;
                }
            }
            told.push_str(&self.restated(rest));
            return told;
        }
    }

    /// Tells a group of numbers in the unit of the largest; the symbol of that unit.
    fn converted(
        self,
        told: &mut String,
        group: &[(usize, usize)],
        (symbol, size): (&str, f64),
    ) -> Option<&'static str> {
        let value = |&(start, end): &(usize, usize)| {
            let text = told[start..end].replace('−', "-");
            text.parse::<f64>().unwrap_or(f64::NAN)
        };
        let values: Vec<f64> = group.iter().map(value).collect();
        if symbol == "°C" {
            if self != Self::Inch {
                return None;
            }
            for (&(start, end), value) in group.iter().zip(&values).rev() {
                let places = decimals(&told[start..end]);
                let new = format!("{:.places$}", 1.8 * value + 32.0);
                let new = signed(new, &told[start..end]);
                told.replace_range(start..end, &new);
            }
            return Some("°F");
        }
        let largest = values.iter().map(|value| value.abs()).fold(0.0, f64::max);
        let unit = self.instead(symbol, largest * size)?;
        for (&(start, end), value) in group.iter().zip(&values).rev() {
            let factor = size / unit.size;
            // A change of name alone changes no digit.
            if (factor - 1.0).abs() > 1e-12 {
                let written = &told[start..end];
                let kept = significant(value * factor, last_place(written) * factor);
                let new = signed(rounded(value * factor, kept), written);
                told.replace_range(start..end, &new);
            }
        }
        Some(unit.name)
    }
}

/// Length of the number that a text begins with, bytes; 0 where it begins with none.
fn number(text: &str) -> usize {
    let sign = text.len() - text.trim_start_matches(['-', '−']).len();
    let digits =
        |text: &str| text.len() - text.trim_start_matches(|c: char| c.is_ascii_digit()).len();
    let whole = digits(&text[sign..]);
    if whole == 0 {
        return 0;
    }
    let mut length = sign + whole;
    if let Some(rest) = text[length..].strip_prefix('.') {
        let places = digits(rest);
        if places > 0 {
            length += 1 + places;
        }
    }
    if let Some(rest) = text[length..].strip_prefix('e') {
        let minus = usize::from(rest.starts_with('-'));
        let power = digits(&rest[minus..]);
        if power > 0 {
            length += 1 + minus + power;
        }
    }
    length
}

/// Whether what stands between two numbers makes them one group.
fn joins(between: &str) -> bool {
    let words: Vec<&str> = between.split_whitespace().collect();
    matches!(
        words.as_slice(),
        ["to" | "or" | "and" | "by" | "×" | "±" | "("] | [",", "y"]
    ) || matches!(between.trim(), "(" | "," | ", y" | ") to")
}

/// Whether a text begins with a symbol that ends there.
fn stands(text: &str, symbol: &str) -> bool {
    text.strip_prefix(symbol).is_some_and(|rest| {
        rest.chars().next().is_none_or(|next| {
            !(next.is_alphanumeric() || matches!(next, '/' | '·' | '²' | '³' | '(' | '^'))
        })
    })
}

/// A number with the minus that stood before it.
fn signed(new: String, written: &str) -> String {
    match new.strip_prefix('-') {
        Some(size) if written.starts_with('−') => format!("−{size}"),
        _ => new,
    }
}

/// Decimals of a written number.
fn decimals(written: &str) -> usize {
    written
        .split_once('.')
        .map_or(0, |(_, places)| places.len())
}

/// What the last digit of a written number counts.
fn last_place(written: &str) -> f64 {
    let (mantissa, power) = written.split_once('e').unwrap_or((written, "0"));
    let power: i32 = power.parse().unwrap_or(0);
    10.0_f64.powi(power - decimals(mantissa) as i32)
}

/// Significant digits of a value that is known to a step: the last one counts no less than the step,
/// so that 1.017 N·m is 9.00 in·lbf and not 9.001. Two at least and four at most.
fn significant(value: f64, step: f64) -> usize {
    // Rounding aside, a power of ten is its own place.
    const NEAR: f64 = 1e-6;
    let place = (step.log10() - NEAR).ceil();
    let first = (value.abs().log10() + NEAR).floor();
    (first - place + 1.0).clamp(2.0, 4.0) as usize
}

/// A number with so many significant digits.
fn rounded(value: f64, digits: usize) -> String {
    if value == 0.0 || !value.is_finite() {
        return "0".to_owned();
    }
    let scientific = format!("{value:.*e}", digits - 1);
    let (mantissa, power) = scientific.split_once('e').unwrap_or((&scientific, "0"));
    let power: i32 = power.parse().unwrap_or(0);
    if !(-4..7).contains(&power) {
        return format!("{mantissa}e{power}");
    }
    let places = (digits as i32 - 1 - power).max(0) as usize;
    let near: f64 = scientific.parse().unwrap_or(value);
    format!("{near:.places$}")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_of_users_stand_as_they_are() {
        let names = ["6 mm carrier", "lid", "2 mm"].map(str::to_owned);
        let told = |text| System::Inch.restated_around(text, &names);
        assert_eq!(
            told("6 mm carrier: gap 25.4 µm; lid 50.8 mm (2 mm)"),
            "6 mm carrier: gap 1.00 mil; lid 2.00 in (2 mm)"
        );
        // A number that ends like a name is no name.
        assert_eq!(
            told("12 mm of 16 mm carriers"),
            "0.47 in of 0.63 in carriers"
        );
    }

    #[test]
    fn every_kind_has_the_unit_of_its_exact_definition() {
        // International inch 0.0254 m, pound 0.45359237 kg, standard gravity 9.80665 m/s², Btu_IT
        // 1055.05585262 J: the numbers are products of these, reckoned by hand to seven figures.
        for (shown, name, size) in [
            (Shown::Force, "lbf", 4.448222),
            (Shown::Torque, "in·lbf", 0.1129848),
            (Shown::Pressure, "psi", 6894.757),
            (Shown::GasPressure, "psi", 6894.757),
            (Shown::Length, "in", 0.0254),
            (Shown::Gap, "mil", 2.54e-5),
            (Shown::Area, "in²", 6.4516e-4),
            (Shown::Conductance, "Btu/(h·ft²·°F)", 5.678263),
            (Shown::SmallMass, "lb", 0.4535924),
            (Shown::Mass, "lb", 0.4535924),
        ] {
            let unit = System::Inch.unit(shown);
            assert_eq!(unit.name, name);
            assert!(
                (unit.size / size - 1.0).abs() < 1e-6,
                "{name}: {}",
                unit.size
            );
        }
        assert_eq!(System::Shop.unit(Shown::Pressure).name, "N/mm²");
        assert_eq!(System::Shop.unit(Shown::GasPressure).name, "bar");
    }

    #[test]
    fn sentences_are_told_in_inches_by_known_conversions() {
        for (metric, inch) in [
            (
                "within 25.40 mm of a bolt axis",
                "within 1.000 in of a bolt axis",
            ),
            ("flatness 50.8 µm closes", "flatness 2.00 mil closes"),
            ("Rq 0.8 to 1.27 µm", "Rq 31 to 50 µin"),
            ("Rq 25 nm", "Rq 0.98 µin"),
            ("at least 1.70 N·m", "at least 15.0 in·lbf"),
            // Stated as 9 in·lbf, which is 1.01686 N·m.
            ("stated 1.017 N·m", "stated 9.00 in·lbf"),
            ("at most 54.23 N·m", "at most 40.00 ft·lbf"),
            (
                "force 4.448 (2.224 to 8.896) kN at",
                "force 1000 (500 to 2000) lbf at",
            ),
            ("about 6.895 MPa", "about 1000 psi"),
            ("yield 276 MPa", "yield 40 ksi"),
            ("modulus 68.9 GPa", "modulus 10 Msi"),
            ("gas at 101.3 kPa", "gas at 14.7 psi"),
            ("5678 W/(m²·K), then", "1000 Btu/(h·ft²·°F), then"),
            ("170 W/(m·K)", "98 Btu/(h·ft·°F)"),
            ("189000 W/(m²·K)", "33280 Btu/(h·ft²·°F)"),
            ("23.6 µm/(m·K)", "13.1 µin/(in·°F)"),
            ("64.52 cm² of", "10.00 in² of"),
            ("0.5 K·cm²/W", "0.078 °C·in²/W"),
            ("2700 kg/m³", "0.0975 lb/in³"),
            ("x 25.4, y 50.8 mm of box", "x 1.00, y 2.00 in of box"),
            ("sink at 20.0 °C", "sink at 68.0 °F"),
            ("sink at −20.0 °C", "sink at −4.0 °F"),
            ("a face at −25.40 mm", "a face at −1.000 in"),
            ("sink at −40 °C", "sink at −40 °F"),
            ("line ends 25.4\n  mm of", "line ends 1.00\n  in of"),
        ] {
            assert_eq!(System::Inch.restated(metric), inch);
        }
    }

    #[test]
    fn what_is_no_number_with_a_known_unit_stays() {
        for text in [
            "bolts 1 to 4, M5 A2-70",
            "0.15 K/W and 6.5 W/K at 22 W: 3.4 K",
            "5 % and 95 % of 256 draws, seed 1",
            "plate2 mm, 3 Newton, 4 mmHg",
            "law 5 N·m/rad",
        ] {
            assert_eq!(System::Inch.restated(text), text);
        }
        let text = "12 mm, 3 kN and 80 MPa";
        assert_eq!(System::Si.restated(text), text);
        assert_eq!(System::Shop.restated(text), "12 mm, 3 kN and 80 N/mm²");
        assert_eq!(System::Shop.restated("at 101.3 kPa"), "at 1.013 bar");
    }
}
