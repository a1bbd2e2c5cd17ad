//! SI as text, for messages and reports.

use crate::units::Quantity;

/// Digits shown.
const DIGITS: usize = 4;

/// Temperatures at or above this are shown in °C, below in K: at the boiling point of nitrogen
/// engineers speak of kelvins.
const COLDEST_IN_CELSIUS: f64 = 150.0;

/// A value in SI with four significant digits and the unit people use at its size.
///
/// Trailing zeros are dropped, the minus is plain ASCII. [`parse`](crate::units::parse) reads the
/// text back within half a unit of the fourth digit.
///
/// ```
/// use ringsum::units::{Quantity, show};
/// assert_eq!(show(0.0125, Quantity::Length), "12.5 mm");
/// assert_eq!(show(293.15, Quantity::Temperature), "20 °C");
/// ```
pub fn show(value: f64, quantity: Quantity) -> String {
    if value.is_nan() {
        return format!("no {}", quantity.name());
    }
    if value.is_infinite() {
        return format!("infinite {}", quantity.name());
    }
    let (scaled, unit) = scaled(value, quantity);
    format!("{} {unit}", digits(scaled))
}

/// The number to show, and its unit.
fn scaled(value: f64, quantity: Quantity) -> (f64, &'static str) {
    let size = value.abs();
    let (factor, unit) = match quantity {
        Quantity::Temperature if value >= COLDEST_IN_CELSIUS => return (value - 273.15, "°C"),
        Quantity::Temperature | Quantity::TemperatureDifference => (1.0, "K"),
        Quantity::Length => step(
            size,
            &[(1e-7, 1e9, "nm"), (1e-4, 1e6, "µm"), (10.0, 1e3, "mm")],
            "m",
        ),
        Quantity::Force => match size {
            0.0..1e3 => (1.0, "N"),
            1e3..1e6 => (1e-3, "kN"),
            _ => (1e-6, "MN"),
        },
        Quantity::Torque => step(size, &[(1e-2, 1e3, "N·mm")], "N·m"),
        Quantity::Pressure => match size {
            0.0..1e3 => (1.0, "Pa"),
            1e3..1e6 => (1e-3, "kPa"),
            1e6..1e9 => (1e-6, "MPa"),
            _ => (1e-9, "GPa"),
        },
        Quantity::Power => match size {
            0.0..1.0 => (1e3, "mW"),
            1.0..1e3 => (1.0, "W"),
            _ => (1e-3, "kW"),
        },
        Quantity::Resistance => step(size, &[(1e-3, 1e3, "mK/W")], "K/W"),
        Quantity::Conductance => step(size, &[(1e-3, 1e3, "mW/K")], "W/K"),
        Quantity::AreaResistance => (1e4, "K·cm²/W"),
        Quantity::Expansion => (1e6, "µm/(m·K)"),
        Quantity::Ratio => (1e2, "%"),
        Quantity::Angle => (180.0 / std::f64::consts::PI, "°"),
        Quantity::Area => step(size, &[(1e-3, 1e6, "mm²"), (1.0, 1e4, "cm²")], "m²"),
        Quantity::Conductivity
        | Quantity::FilmCoefficient
        | Quantity::Density
        | Quantity::HeatFlux
        | Quantity::Curvature => (1.0, quantity.unit()),
    };
    (value * factor, unit)
}

/// The first step whose upper end lies above `size`, else the SI unit itself. Zero takes the last step.
fn step(size: f64, steps: &[(f64, f64, &'static str)], si: &'static str) -> (f64, &'static str) {
    let found = if size == 0.0 {
        steps.last().filter(|(_, _, unit)| *unit == "mm")
    } else {
        steps.iter().find(|(end, _, _)| size < *end)
    };
    found.map_or((1.0, si), |&(_, factor, unit)| (factor, unit))
}

/// A number with four significant digits, without trailing zeros; powers of ten where plain
/// digits would run beyond seven places.
fn digits(value: f64) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    let scientific = format!("{value:.*e}", DIGITS - 1);
    let (mantissa, power) = scientific.split_once('e').unwrap_or((&scientific, "0"));
    let power: i32 = power.parse().unwrap_or(0);
    if !(-4..7).contains(&power) {
        return format!("{}e{power}", trimmed(mantissa));
    }
    let places = (DIGITS as i32 - 1 - power).max(0) as usize;
    // The rounded value is formatted, so that 12346 shows as 12350 like its four digits say.
    let rounded: f64 = scientific.parse().unwrap_or(value);
    trimmed(&format!("{rounded:.places$}")).to_owned()
}

fn trimmed(text: &str) -> &str {
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.')
    } else {
        text
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn values_are_shown_as_the_trade_writes_them() {
        for (value, quantity, text) in [
            (0.0, Quantity::Length, "0 mm"),
            (4e-3, Quantity::Length, "4 mm"),
            (0.8e-6, Quantity::Length, "0.8 µm"),
            (64e-9, Quantity::Length, "64 nm"),
            (0.160, Quantity::Length, "160 mm"),
            (-6.37e-6, Quantity::Length, "-6.37 µm"),
            (5000.0, Quantity::Force, "5 kN"),
            (812.34, Quantity::Force, "812.3 N"),
            (0.0, Quantity::Force, "0 N"),
            (1.7, Quantity::Torque, "1.7 N·m"),
            (0.0, Quantity::Torque, "0 N·m"),
            (94.66e6, Quantity::Pressure, "94.66 MPa"),
            (68.9e9, Quantity::Pressure, "68.9 GPa"),
            (293.15, Quantity::Temperature, "20 °C"),
            (77.0, Quantity::Temperature, "77 K"),
            (44264.0, Quantity::FilmCoefficient, "44260 W/(m²·K)"),
            (0.27844, Quantity::Resistance, "0.2784 K/W"),
            (0.00262, Quantity::Resistance, "0.00262 K/W"),
            (382.04, Quantity::Conductance, "382 W/K"),
            (4.262e-5, Quantity::AreaResistance, "0.4262 K·cm²/W"),
            (0.05, Quantity::Ratio, "5 %"),
            (23.6e-6, Quantity::Expansion, "23.6 µm/(m·K)"),
            (1e-12, Quantity::Force, "1e-12 N"),
            (999.96, Quantity::Force, "1000 N"),
            (
                f64::INFINITY,
                Quantity::Resistance,
                "infinite thermal resistance",
            ),
        ] {
            assert_eq!(show(value, quantity), text);
        }
    }
}
