//! Quantities as text: what is read, what is refused and how, and that no text is too strange.

use proptest::{prelude::*, test_runner::RngSeed};
use ringsum::units::{LONGEST, Quantity, parse, parse_roughness, show};

/// Definitions are exact; what is left is the rounding of a few multiplications.
const ROUNDING: f64 = 1e-14;

fn assert_reads(text: &str, quantity: Quantity, expected: f64) {
    let value = parse(text, quantity).unwrap_or_else(|fault| panic!("`{text}`: {fault}"));
    assert!(
        (value - expected).abs() <= ROUNDING * expected.abs(),
        "`{text}` read {value}, expected {expected}"
    );
}

/// Checks that `text` is refused, that the message holds `found` and the help holds `fix`.
fn assert_refused(text: &str, quantity: Quantity, found: &str, fix: &str) {
    let fault = parse(text, quantity).expect_err(text);
    let help = fault.help.clone().unwrap_or_default();
    assert!(
        fault.message.contains(found) && help.contains(fix),
        "`{text}`: {fault}"
    );
}

#[test]
fn every_example_reads_as_its_quantity() {
    for quantity in Quantity::ALL {
        assert!(parse(quantity.example(), quantity).is_ok(), "{quantity:?}");
        let si = format!("2 {}", quantity.unit());
        if quantity != Quantity::Ratio {
            assert_eq!(parse(&si, quantity), Ok(2.0), "{quantity:?}");
        }
    }
}

#[test]
fn lengths_are_read() {
    for (text, metres) in [
        ("2 m", 2.0),
        ("2 cm", 0.02),
        ("25 mm", 0.025),
        ("25mm", 0.025),
        (" 25  mm ", 0.025),
        ("+25 mm", 0.025),
        ("-25 mm", -0.025),
        ("−25 mm", -0.025),
        (".5 mm", 0.5e-3),
        ("5. mm", 5e-3),
        ("2.5e-3 m", 2.5e-3),
        ("2.5E1 mm", 2.5e-2),
        ("3 µm", 3e-6),
        ("3 μm", 3e-6),
        ("3 um", 3e-6),
        ("60 nm", 60e-9),
        ("1 in", 0.0254),
        ("1/4 in", 0.00635),
        ("2 mil", 50.8e-6),
        ("2 thou", 50.8e-6),
        ("32 µin", 0.8128e-6),
        ("32 uin", 0.8128e-6),
        ("1 ft", 0.3048),
    ] {
        assert_reads(text, Quantity::Length, metres);
    }
}

#[test]
fn forces_and_torques_are_read() {
    // 1 lbf = 4.4482216152605 N and 1 in = 0.0254 m, both exact.
    const POUND_FORCE: f64 = 4.448_221_615_260_5;
    const INCH_POUND: f64 = POUND_FORCE * 0.0254;
    for (text, newtons) in [
        ("5 N", 5.0),
        ("5 kN", 5e3),
        ("5 MN", 5e6),
        ("5 kgf", 49.03325),
        ("5 lbf", 5.0 * POUND_FORCE),
        ("5 lb", 5.0 * POUND_FORCE),
    ] {
        assert_reads(text, Quantity::Force, newtons);
    }
    for (text, newton_metres) in [
        ("1.7 N·m", 1.7),
        ("1.7 N⋅m", 1.7),
        ("1.7 N*m", 1.7),
        ("1.7 N m", 1.7),
        ("1.7 Nm", 1.7),
        ("1.7 N.m", 1.7),
        ("1.7 N-m", 1.7),
        ("170 N·cm", 1.7),
        ("1700 N·mm", 1.7),
        ("10 kgf·cm", 0.980665),
        ("12 in·lbf", 12.0 * INCH_POUND),
        ("12 in-lbf", 12.0 * INCH_POUND),
        ("12 in lbf", 12.0 * INCH_POUND),
        ("12 lbf·in", 12.0 * INCH_POUND),
        ("12 in-lb", 12.0 * INCH_POUND),
        ("1 ft·lbf", 12.0 * INCH_POUND),
        ("1 ft-lb", 12.0 * INCH_POUND),
        ("16 oz·in", INCH_POUND),
        ("16 oz-in", INCH_POUND),
    ] {
        assert_reads(text, Quantity::Torque, newton_metres);
    }
}

#[test]
fn pressures_are_read() {
    // NIST SP 811 gives 1 psi = 6894.757 Pa; the product of the definitions has more digits.
    const PSI: f64 = 4.448_221_615_260_5 / (0.0254 * 0.0254);
    for (text, pascals) in [
        ("5 Pa", 5.0),
        ("5 kPa", 5e3),
        ("5 MPa", 5e6),
        ("5 N/mm²", 5e6),
        ("5 GPa", 5e9),
        ("5 bar", 5e5),
        ("5 mbar", 5e2),
        ("5 hPa", 5e2),
        ("1 atm", 101_325.0),
        ("760 Torr", 101_325.0),
        ("14 psi", 14.0 * PSI),
        ("14 ksi", 14e3 * PSI),
        ("1e-6 mbar", 1e-4),
        ("1 kgf/cm²", 98_066.5),
    ] {
        assert_reads(text, Quantity::Pressure, pascals);
    }
}

#[test]
fn a_temperature_is_not_a_temperature_difference() {
    for (text, absolute, difference) in [
        ("5 K", 5.0, 5.0),
        ("5 °C", 278.15, 5.0),
        ("5 degC", 278.15, 5.0),
        ("5 ℃", 278.15, 5.0),
        ("-20 °C", 253.15, -20.0),
        ("9 °F", 468.67 * 5.0 / 9.0, 5.0),
        ("9 degF", 468.67 * 5.0 / 9.0, 5.0),
        ("20 mK", 0.02, 0.02),
    ] {
        assert_reads(text, Quantity::Temperature, absolute);
        assert_reads(text, Quantity::TemperatureDifference, difference);
    }
    assert_reads("32 °F", Quantity::Temperature, 273.15);
    assert_reads("-273.15 °C", Quantity::Temperature, 0.0);
}

#[test]
fn thermal_quantities_are_read() {
    // 1 Btu(IT) = 1055.05585262 J and 1 ft = 0.3048 m, both exact.
    const BTU: f64 = 1_055.055_852_62;
    const PER_HOUR_AND_FAHRENHEIT: f64 = 1.8 / 3600.0;
    const FOOT: f64 = 0.3048;
    for (text, quantity, si) in [
        ("22 W", Quantity::Power, 22.0),
        ("22 mW", Quantity::Power, 0.022),
        ("22 kW", Quantity::Power, 22e3),
        ("167 W/(m·K)", Quantity::Conductivity, 167.0),
        ("167 W/mK", Quantity::Conductivity, 167.0),
        ("167 W/m/K", Quantity::Conductivity, 167.0),
        ("167 W/(m·°C)", Quantity::Conductivity, 167.0),
        ("167 W m^-1 K^-1", Quantity::Conductivity, 167.0),
        ("1.67 W/(cm·K)", Quantity::Conductivity, 167.0),
        ("1.67 W/cmK", Quantity::Conductivity, 167.0),
        (
            "2 Btu/(h·ft·°F)",
            Quantity::Conductivity,
            2.0 * BTU * PER_HOUR_AND_FAHRENHEIT / FOOT,
        ),
        (
            "12 Btu·in/(h·ft²·°F)",
            Quantity::Conductivity,
            BTU * PER_HOUR_AND_FAHRENHEIT / FOOT,
        ),
        ("500 W/(m²·K)", Quantity::FilmCoefficient, 500.0),
        ("500 W/m2K", Quantity::FilmCoefficient, 500.0),
        ("500 W/m²K", Quantity::FilmCoefficient, 500.0),
        ("500 W/m^2/K", Quantity::FilmCoefficient, 500.0),
        ("500 W/(m^2 K)", Quantity::FilmCoefficient, 500.0),
        ("0.05 W/(cm²·K)", Quantity::FilmCoefficient, 500.0),
        (
            "2 Btu/(h·ft²·°F)",
            Quantity::FilmCoefficient,
            2.0 * BTU * PER_HOUR_AND_FAHRENHEIT / (FOOT * FOOT),
        ),
        ("0.25 K/W", Quantity::Resistance, 0.25),
        ("0.25 °C/W", Quantity::Resistance, 0.25),
        ("250 mK/W", Quantity::Resistance, 0.25),
        ("4 W/K", Quantity::Conductance, 4.0),
        ("4 mW/K", Quantity::Conductance, 4e-3),
        ("4 W/°C", Quantity::Conductance, 4.0),
        ("2 K·m²/W", Quantity::AreaResistance, 2.0),
        ("2 m²·K/W", Quantity::AreaResistance, 2.0),
        ("2 m2K/W", Quantity::AreaResistance, 2.0),
        ("2 K·cm²/W", Quantity::AreaResistance, 2e-4),
        ("2 °C·cm²/W", Quantity::AreaResistance, 2e-4),
        ("2 K·in²/W", Quantity::AreaResistance, 2.0 * 0.0254 * 0.0254),
        (
            "2 °C·in²/W",
            Quantity::AreaResistance,
            2.0 * 0.0254 * 0.0254,
        ),
        (
            "2 °C in²/W",
            Quantity::AreaResistance,
            2.0 * 0.0254 * 0.0254,
        ),
        ("2 mm²·K/W", Quantity::AreaResistance, 2e-6),
        ("2 mm²K/W", Quantity::AreaResistance, 2e-6),
        ("2 W⁻¹·m²·K", Quantity::AreaResistance, 2.0),
        ("23.6 µm/(m·K)", Quantity::Expansion, 23.6e-6),
        ("23.6 µm/m/K", Quantity::Expansion, 23.6e-6),
        ("23.6 ppm/K", Quantity::Expansion, 23.6e-6),
        ("23.6e-6 1/K", Quantity::Expansion, 23.6e-6),
        ("23.6e-6 /K", Quantity::Expansion, 23.6e-6),
        ("23.6e-6/K", Quantity::Expansion, 23.6e-6),
        ("0.02 1/m", Quantity::Curvature, 0.02),
        ("0.02 /m", Quantity::Curvature, 0.02),
        ("2e-5 1/mm", Quantity::Curvature, 0.02),
        ("-0.02 m^-1", Quantity::Curvature, -0.02),
        ("20 kW/m²", Quantity::HeatFlux, 2e4),
        ("2 W/cm²", Quantity::HeatFlux, 2e4),
        ("23.6e-6 K⁻¹", Quantity::Expansion, 23.6e-6),
        ("2 W/cm²", Quantity::HeatFlux, 2e4),
    ] {
        assert_reads(text, quantity, si);
    }
}

#[test]
fn ratios_angles_densities_and_areas_are_read() {
    for (text, quantity, si) in [
        ("5 %", Quantity::Ratio, 0.05),
        ("5%", Quantity::Ratio, 0.05),
        ("30 ppm", Quantity::Ratio, 30e-6),
        ("180 °", Quantity::Angle, std::f64::consts::PI),
        ("180 deg", Quantity::Angle, std::f64::consts::PI),
        ("0.5 rad", Quantity::Angle, 0.5),
        ("2700 kg/m³", Quantity::Density, 2700.0),
        ("2.7 g/cm³", Quantity::Density, 2700.0),
        (
            "1 lb/in³",
            Quantity::Density,
            0.453_592_37 / (0.0254 * 0.0254 * 0.0254),
        ),
        ("64 cm²", Quantity::Area, 64e-4),
        ("64 mm^2", Quantity::Area, 64e-6),
    ] {
        assert_reads(text, quantity, si);
    }
}

#[test]
fn bare_numbers_are_refused_with_their_unit() {
    assert_refused("6", Quantity::Length, "has no unit", "`6 mm`");
    assert_refused("1.7", Quantity::Torque, "has no unit", "`1.7 N·m`");
    assert_refused("0.05", Quantity::Ratio, "has no unit", "`0.05 %`");
    let fault = parse("6", Quantity::Length).unwrap_err();
    assert_eq!(fault.code, "unit/bare-number");
}

#[test]
fn a_wrong_quantity_is_named() {
    for (text, quantity, found, fix) in [
        (
            "6 N",
            Quantity::Length,
            "`6 N` is a force, and a length is expected",
            "`4 mm`",
        ),
        (
            "6 mm",
            Quantity::Force,
            "is a length, and a force is expected",
            "`5 kN`",
        ),
        (
            "6 nm",
            Quantity::Torque,
            "is a length, and a torque is expected",
            "`6 N·m`",
        ),
        (
            "6 W/mK",
            Quantity::Conductance,
            "is a thermal conductivity",
            "`4 W/K`",
        ),
        (
            "6 K/W",
            Quantity::AreaResistance,
            "is a thermal resistance, and an area",
            "K·cm²/W",
        ),
        (
            "6 kg·cm",
            Quantity::Torque,
            "does not measure a torque",
            "`kgf`",
        ),
        (
            "6 kg",
            Quantity::Force,
            "is a mass, and a force is expected",
            "`kgf`",
        ),
        (
            "6 °",
            Quantity::Ratio,
            "is an angle, and a percentage is expected",
            "`5 %`",
        ),
        (
            "6 %",
            Quantity::Angle,
            "is a plain factor, and an angle is expected",
            "`30 °`",
        ),
        ("6 s", Quantity::Length, "is a time", "`4 mm`"),
        (
            "6 m·K/W",
            Quantity::Resistance,
            "is a thermal resistivity",
            "`0.25 K/W`",
        ),
        (
            "20 W·K/W",
            Quantity::Temperature,
            "is not on a temperature scale",
            "`20 °C`",
        ),
    ] {
        assert_refused(text, quantity, found, fix);
    }
}

#[test]
fn slips_of_upper_and_lower_case_are_refused_with_the_right_spelling() {
    for (text, quantity, fix) in [
        ("80 mpa", Quantity::Pressure, "`80 MPa`"),
        ("80 Mpa", Quantity::Pressure, "`80 MPa`"),
        ("80 gpa", Quantity::Pressure, "`80 GPa`"),
        ("80 KPa", Quantity::Pressure, "`80 kPa`"),
        ("80 PSI", Quantity::Pressure, "`80 psi`"),
        ("5 kn", Quantity::Force, "`5 kN`"),
        ("5 KN", Quantity::Force, "`5 kN`"),
        ("4 Mm", Quantity::Length, "`4 mm`"),
        ("4 MM", Quantity::Length, "`4 mm`"),
        ("4 IN", Quantity::Length, "`4 in`"),
        ("5 k", Quantity::TemperatureDifference, "`5 K`"),
        ("20 C", Quantity::Temperature, "`20 °C`"),
        ("20 F", Quantity::Temperature, "`20 °F`"),
        ("20 w", Quantity::Power, "`20 W`"),
        ("20 NM", Quantity::Torque, "`20 Nm`"),
        ("0.5 k/W", Quantity::Resistance, "`0.5 K/W`"),
    ] {
        assert_refused(text, quantity, "is not a unit", fix);
    }
}

#[test]
fn words_for_symbols_are_refused_with_the_symbol() {
    for (text, quantity, fix) in [
        ("5 microns", Quantity::Length, "`5 µm`"),
        ("5 inches", Quantity::Length, "`5 in`"),
        ("5 Millimetres", Quantity::Length, "`5 mm`"),
        ("500 lbs", Quantity::Force, "`500 lb`"),
        ("12 in-lbs", Quantity::Torque, "`12 in-lb`"),
        ("5 Newton", Quantity::Force, "`5 N`"),
        ("20 ° C", Quantity::Temperature, "`20 °C`"),
        ("20 Celsius", Quantity::Temperature, "`20 °C`"),
        ("30 degrees", Quantity::Angle, "`30 °`"),
        ("5 percent", Quantity::Ratio, "`5 %`"),
        ("2 barg", Quantity::Pressure, "absolute pressure"),
    ] {
        assert_refused(text, quantity, "is not a unit", fix);
    }
}

#[test]
fn what_can_be_read_two_ways_is_refused() {
    for (text, quantity, fix) in [
        ("1.7 W/cm·K", Quantity::Conductivity, "`1.7 W/(cm·K)`"),
        ("1.7 W/m K", Quantity::Conductivity, "`1.7 W/(m K)`"),
        ("1.7 K/W·m²", Quantity::AreaResistance, "brackets"),
    ] {
        assert_refused(text, quantity, "can be read two ways", fix);
    }
}

#[test]
fn numbers_that_need_a_guess_are_refused() {
    for (text, found, fix) in [
        ("", "is empty", "`4 mm`"),
        ("1,5 mm", "the decimal sign is a point", "`1.5 mm`"),
        ("1,000 mm", "the decimal sign is a point", "`1000 mm`"),
        ("1,000.5 mm", "the decimal sign is a point", "`1"),
        ("1_000 mm", "grouped digits", "without a sign"),
        ("1 000 mm", "two numbers", "without spaces"),
        ("inf mm", "not a finite number", "`4 mm`"),
        ("-nan mm", "not a finite number", "`4 mm`"),
        ("1e999 mm", "too large", "`4 mm`"),
        ("5-6 mm", "more than one number", "`4 mm`"),
        ("5 - 6 mm", "more than one number", "`4 mm`"),
        ("5 ± 1 mm", "more than one number", "`4 mm`"),
        ("5..6 mm", "more than one number", "`4 mm`"),
        ("1.2×10^-4 m", "power of ten", "1.2e-4"),
        ("1.2 x 10⁻⁴ m", "power of ten", "1.2e-4"),
        ("M8", "is a thread", "`8 mm`"),
        ("Ø 5 mm", "diameter sign", "`5 mm`"),
        ("1e308 km", "too large", "`4 mm`"),
        ("1.2.3 mm", "more than one number", "`4 mm`"),
        ("mm", "does not start with a number", "`4 mm`"),
        ("0.25\"", "double quote", "`0.25 in`"),
        ("3'", "quote", "`ft`"),
        ("3 mm)", "the sign", "`4 mm`"),
        ("3 m^", "unfinished", "`4 mm`"),
        ("3 m^20", "power that no quantity has", "`4 mm`"),
        ("3 furlong", "is not a unit", "`4 mm`"),
        ("3 $", "the sign `$`", "`4 mm`"),
        ("3 m 2", "number `2`", "`4 mm`"),
    ] {
        assert_refused(text, Quantity::Length, found, fix);
    }
}

#[test]
fn temperatures_below_absolute_zero_are_refused() {
    assert_refused(
        "-300 °C",
        Quantity::Temperature,
        "below absolute zero",
        "`77 K`",
    );
    assert_refused(
        "-1 K",
        Quantity::Temperature,
        "below absolute zero",
        "`77 K`",
    );
}

#[test]
fn texts_beyond_the_limit_are_refused_before_they_are_read() {
    let long = format!("5 {}", "m".repeat(LONGEST));
    assert_refused(&long, Quantity::Length, "characters", "`4 mm`");
    assert_refused(
        &"(".repeat(1_000_000),
        Quantity::Length,
        "characters",
        "`4 mm`",
    );
}

/// Texts made of what quantities are made of, which reach deeper than random ones.
fn nearly_a_quantity() -> impl Strategy<Value = String> {
    let piece = prop::sample::select(vec![
        "1", "25", ".", ",", "e", "-", "−", "+", " ", "/", "·", "*", "(", ")", "^", "²", "⁻", "9",
        "m", "mm", "µm", "in", "N", "lbf", "lb", "K", "°", "°C", "W", "Btu", "mK", "h", "ft", "%",
        "Ra", "Rz", "N7", "M", "\"", "×10", "inf",
    ]);
    prop::collection::vec(piece, 0..14).prop_map(|pieces| pieces.concat())
}

proptest! {
    #![proptest_config(ProptestConfig {
        // A fixed seed: the same texts in every run.
        rng_seed: RngSeed::Fixed(1),
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    #[test]
    fn any_text_is_read_or_refused(text in "(?s).{0,40}", at in 0_usize..Quantity::ALL.len()) {
        let _ = parse(&text, Quantity::ALL[at]);
        let _ = parse_roughness(&text);
    }

    #[test]
    fn any_near_miss_is_read_or_refused(text in nearly_a_quantity(), at in 0_usize..Quantity::ALL.len()) {
        match parse(&text, Quantity::ALL[at]) {
            Ok(value) => prop_assert!(value.is_finite()),
            Err(fault) => prop_assert!(fault.help.is_some()),
        }
        let _ = parse_roughness(&text);
    }

    #[test]
    fn what_is_shown_reads_back(
        mantissa in 1.0_f64..10.0,
        power in -12_i32..12,
        negative in any::<bool>(),
        at in 0_usize..Quantity::ALL.len(),
    ) {
        let quantity = Quantity::ALL[at];
        let sign = if negative && quantity != Quantity::Temperature { -1.0 } else { 1.0 };
        let value = sign * mantissa * 10_f64.powi(power);
        let text = show(value, quantity);
        let back = parse(&text, quantity)
            .map_err(|fault| TestCaseError::fail(format!("{text}: {fault}")))?;
        // Half a unit of the fourth digit is at most 5e-4 of the number.
        prop_assert!((back / value - 1.0).abs() <= 5.01e-4, "{value} shown as {text} read {back}");
    }

    #[test]
    fn space_around_a_quantity_changes_nothing(value in -1e6_f64..1e6) {
        let tight = parse(&format!("{value}mm"), Quantity::Length);
        let loose = parse(&format!("  {value}   mm "), Quantity::Length);
        prop_assert!(tight.is_ok());
        prop_assert_eq!(tight, loose);
    }
}
