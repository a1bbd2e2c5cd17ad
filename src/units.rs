//! Text with a unit ⇄ SI; units exist only here.
//!
//! Every dimensioned entry of a joint file or catalogue is a text such as `"1.7 N·m"`.
//! What cannot be read without guessing is refused with the fix: a bare number, a decimal comma,
//! a slip of upper and lower case, `W/cm·K`.

mod dimension;
mod expression;
mod fix;
mod number;
mod roughness;
mod show;
mod symbols;
mod system;

pub use roughness::{RMS_OVER_MEAN, RZ_OVER_RA, Roughness, parse_roughness};
pub use show::show;
pub use system::{Shown, System, Unit};

use crate::units::{
    dimension::Dimension,
    expression::{Measure, Reading},
};

/// Longest text read as a quantity, characters; longer ones are refused before any work is done.
pub const LONGEST: usize = 80;

/// What a text measures.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Quantity {
    /// Length, m.
    Length,
    /// Force, N.
    Force,
    /// Torque, N m.
    Torque,
    /// Pressure or stress, Pa.
    Pressure,
    /// Absolute temperature, K; `20 °C` reads 293.15 K.
    Temperature,
    /// Difference of two temperatures, K; `5 °C` reads 5 K and `9 °F` reads 5 K.
    TemperatureDifference,
    /// Heat flow, W.
    Power,
    /// Thermal conductivity, W/(m K).
    Conductivity,
    /// Heat flow per area and kelvin, W/(m² K).
    FilmCoefficient,
    /// Thermal resistance, K/W.
    Resistance,
    /// Thermal conductance, W/K.
    Conductance,
    /// Thermal resistance times area, m² K/W.
    AreaResistance,
    /// Coefficient of thermal expansion, 1/K.
    Expansion,
    /// A part of a whole, 1; written in `%` or `ppm`, never bare.
    Ratio,
    /// Plane angle, rad.
    Angle,
    /// Mass per volume, kg/m³.
    Density,
    /// Heat flow per area, W/m².
    HeatFlux,
    /// Area, m².
    Area,
    /// Curvature, 1/m.
    Curvature,
}

impl Quantity {
    /// Every quantity, in the order of the definition.
    pub const ALL: [Self; 19] = [
        Self::Length,
        Self::Force,
        Self::Torque,
        Self::Pressure,
        Self::Temperature,
        Self::TemperatureDifference,
        Self::Power,
        Self::Conductivity,
        Self::FilmCoefficient,
        Self::Resistance,
        Self::Conductance,
        Self::AreaResistance,
        Self::Expansion,
        Self::Ratio,
        Self::Angle,
        Self::Density,
        Self::HeatFlux,
        Self::Area,
        Self::Curvature,
    ];

    /// Name in the trade, singular and without an article.
    pub fn name(self) -> &'static str {
        match self {
            Self::Length => "length",
            Self::Force => "force",
            Self::Torque => "torque",
            Self::Pressure => "pressure",
            Self::Temperature => "temperature",
            Self::TemperatureDifference => "temperature difference",
            Self::Power => "power",
            Self::Conductivity => "thermal conductivity",
            Self::FilmCoefficient => "film coefficient",
            Self::Resistance => "thermal resistance",
            Self::Conductance => "thermal conductance",
            Self::AreaResistance => "area resistance",
            Self::Expansion => "thermal expansion coefficient",
            Self::Ratio => "percentage",
            Self::Angle => "angle",
            Self::Density => "density",
            Self::HeatFlux => "heat flux",
            Self::Area => "area",
            Self::Curvature => "curvature",
        }
    }

    /// The name with its article: `a length`, `an angle`.
    pub fn with_article(self) -> String {
        fix::with_article(self.name())
    }

    /// A text that reads as this quantity.
    pub fn example(self) -> &'static str {
        match self {
            Self::Length => "4 mm",
            Self::Force => "5 kN",
            Self::Torque => "1.7 N·m",
            Self::Pressure => "80 MPa",
            Self::Temperature => "20 °C",
            Self::TemperatureDifference => "5 K",
            Self::Power => "22 W",
            Self::Conductivity => "167 W/(m·K)",
            Self::FilmCoefficient => "500 W/(m²·K)",
            Self::Resistance => "0.25 K/W",
            Self::Conductance => "4 W/K",
            Self::AreaResistance => "0.5 K·cm²/W",
            Self::Expansion => "23.6 µm/(m·K)",
            Self::Ratio => "5 %",
            Self::Angle => "30 °",
            Self::Density => "2700 kg/m³",
            Self::HeatFlux => "2 W/cm²",
            Self::Area => "64 cm²",
            Self::Curvature => "0.02 1/m",
        }
    }

    /// The SI unit in which [`parse`] answers.
    pub fn unit(self) -> &'static str {
        match self {
            Self::Length => "m",
            Self::Force => "N",
            Self::Torque => "N·m",
            Self::Pressure => "Pa",
            Self::Temperature | Self::TemperatureDifference => "K",
            Self::Power => "W",
            Self::Conductivity => "W/(m·K)",
            Self::FilmCoefficient => "W/(m²·K)",
            Self::Resistance => "K/W",
            Self::Conductance => "W/K",
            Self::AreaResistance => "m²·K/W",
            Self::Expansion => "1/K",
            Self::Ratio => "1",
            Self::Angle => "rad",
            Self::Density => "kg/m³",
            Self::HeatFlux => "W/m²",
            Self::Area => "m²",
            Self::Curvature => "1/m",
        }
    }

    /// The unit offered to somebody who wrote none: that of the [`example`](Self::example).
    pub fn usual_unit(self) -> &'static str {
        self.example().split_once(' ').map_or("", |(_, unit)| unit)
    }
}

/// Why a text is not the quantity it should be.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UnitFault {
    /// The stable code of the fault: `unit/bare-number` or `unit/not-a-quantity`.
    pub code: &'static str,
    /// What was found and what is expected.
    pub message: String,
    /// The fix, with an example that works.
    pub help: Option<String>,
}

impl UnitFault {
    /// A fault of a text that is no quantity.
    fn new(message: String, help: impl Into<Option<String>>) -> Self {
        Self {
            code: "unit/not-a-quantity",
            message,
            help: help.into(),
        }
    }
}

impl std::fmt::Display for UnitFault {
    fn fmt(&self, out: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        out.write_str(&self.message)?;
        self.help
            .iter()
            .try_for_each(|help| write!(out, "; {help}"))
    }
}

impl std::error::Error for UnitFault {}

/// Reads `"<number> <unit>"` as `quantity`, in SI.
///
/// The unit is a product and quotient of symbols with whole powers: `W/(m²·K)`, `W/m²K`,
/// `W m^-2 K^-1`, `in·lbf`, `in-lbf`, `N m`. Factors written without any sign between them bind
/// closer than `/`, so `W/m²K` is per square metre and kelvin; `W/cm·K` could mean two things
/// and is refused.
/// A whole fraction such as `1/4 in` is read.
/// `lb` and `oz` are forces where a force fits and masses where only a mass fits.
///
/// ```
/// use ringsum::units::{Quantity, parse};
/// assert_eq!(parse("25 mm", Quantity::Length), Ok(0.025));
/// assert!(parse("25", Quantity::Length).is_err());
/// ```
///
/// Never panics, whatever the text; texts longer than [`LONGEST`] are refused.
pub fn parse(text: &str, quantity: Quantity) -> Result<f64, UnitFault> {
    let text = text.trim();
    let length = text.chars().count();
    if length > LONGEST {
        return Err(UnitFault::new(
            format!(
                "{} is expected, and this text has {length} characters",
                quantity.with_article()
            ),
            fix::such_as(quantity),
        ));
    }
    let (number, unit) = number::split(text, quantity)?;
    if unit.is_empty() {
        return Err(UnitFault {
            code: "unit/bare-number",
            ..fix::bare(text, quantity)
        });
    }
    let wanted = Dimension::of(quantity);
    let measure = expression::evaluate(unit, Reading::Force)
        .map_err(|error| fix::unreadable(text, quantity, &error))?;
    let measure = match expression::evaluate(unit, Reading::Mass) {
        Ok(second) if measure.dimension != wanted && second.dimension == wanted => second,
        _ => measure,
    };
    if measure.dimension != wanted {
        return Err(fix::wrong_dimension(text, quantity, measure.dimension));
    }
    let value = match quantity {
        Quantity::Temperature => kelvin(text, number, unit, measure)?,
        _ => number * measure.size,
    };
    if value.is_finite() {
        Ok(value)
    } else {
        Err(UnitFault::new(
            format!("{} is too large to reckon with", fix::quoted(text)),
            fix::such_as(quantity),
        ))
    }
}

/// Absolute temperature in K from a number on the scale that `unit` names.
fn kelvin(text: &str, number: f64, unit: &str, measure: Measure) -> Result<f64, UnitFault> {
    let Some(zero) = symbols::zero_of_scale(unit) else {
        return Err(UnitFault::new(
            format!(
                "{} is not on a temperature scale; an absolute temperature is expected",
                fix::quoted(text)
            ),
            fix::such_as(Quantity::Temperature),
        ));
    };
    let value = (number + zero) * measure.size;
    if value < 0.0 {
        return Err(UnitFault::new(
            format!("{} lies below absolute zero", fix::quoted(text)),
            "write an absolute temperature such as `20 °C` or `77 K`".to_owned(),
        ));
    }
    Ok(value)
}
