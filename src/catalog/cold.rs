//! Conductivity and contraction away from room temperature, and the refusal to guess them.

use std::fmt;

use crate::catalog::{
    materials,
    records::{ConductivityFit, FitForm, Grade, Material},
};

/// Above this the room-temperature conductivity stands, K.
const ROOM_FROM: f64 = 250.0;
/// Below this a curve is needed, K; between the two the values are blended.
const COLD_BELOW: f64 = 200.0;
/// Below and above these the room-temperature expansion does not serve, K.
const EXPANSION_SERVES: [f64; 2] = [200.0, 450.0];
/// Reference of the contraction tables, K.
const REFERENCE: f64 = 293.0;

/// A property that the catalogue does not know at a temperature.
#[derive(Clone, Debug, PartialEq)]
pub struct ColdFault {
    /// Material or bolt grade.
    pub material: String,
    /// Temperature asked for, K.
    pub temperature: f64,
    /// What is missing there.
    pub missing: Property,
    /// Range in which it is known away from room temperature, K.
    pub known: Option<[f64; 2]>,
}

/// A property that changes in the cold.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Property {
    /// Thermal conductivity.
    Conductivity,
    /// Integrated expansion.
    Contraction,
}

impl fmt::Display for ColdFault {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Self {
            material,
            temperature,
            ..
        } = self;
        let (what, curve) = match self.missing {
            Property::Conductivity => ("conductivity", "curve k(T)"),
            Property::Contraction => ("contraction", "table ΔL/L(T)"),
        };
        write!(
            out,
            "the {what} of {material} is not known at {temperature:.0} K: "
        )?;
        match self.known {
            Some([low, high]) => write!(out, "its {curve} runs from {low:.0} to {high:.0} K")?,
            None => write!(out, "there is no {curve} of it")?,
        }
        write!(out, ", and room-temperature data do not serve in the cold")
    }
}

impl std::error::Error for ColdFault {}

impl ConductivityFit {
    /// Conductivity of the fit, W/(m K), whether or not the temperature lies in its range.
    ///
    /// The forms are those of [`FitForm`]; `temperature` in K.
    ///
    /// Source: NIST cryogenic material properties.
    /// Checked: `fits_return_the_published_outputs`.
    pub fn at(&self, temperature: f64) -> f64 {
        let c = &self.coefficients;
        let exponent = match self.form {
            FitForm::LogPolynomial => {
                let x = temperature.log10();
                c.iter().rev().fold(0.0, |sum, c| sum * x + c)
            }
            FitForm::CopperRational => {
                // Odd and even places are the two polynomials in √T.
                let x = temperature.sqrt();
                let upper = c.iter().step_by(2).rev().fold(0.0, |sum, c| sum * x + c);
                let lower = c.iter().skip(1).step_by(2).rev();
                upper / (1.0 + x * lower.fold(0.0, |sum, c| sum * x + c))
            }
        };
        10.0_f64.powf(exponent)
    }

    fn valid_at(&self, temperature: f64) -> bool {
        (self.valid[0]..=self.valid[1]).contains(&temperature)
    }
}

/// What is known of a body in the cold.
struct Known<'a> {
    name: &'a str,
    conductivity: f64,
    fit: Option<&'a ConductivityFit>,
    expansion: f64,
    contraction: Option<&'a [(f64, f64)]>,
}

impl Known<'_> {
    fn fault(&self, temperature: f64, missing: Property) -> ColdFault {
        ColdFault {
            material: self.name.to_owned(),
            temperature,
            missing,
            known: match missing {
                Property::Conductivity => self.fit.map(|fit| fit.valid),
                Property::Contraction => self
                    .contraction
                    .and_then(|table| Some([table.first()?.0, EXPANSION_SERVES[1]])),
            },
        }
    }

    fn conductivity_at(&self, temperature: f64) -> Result<f64, ColdFault> {
        let room = self.conductivity;
        if temperature >= ROOM_FROM {
            return Ok(room);
        }
        match self.fit.filter(|fit| fit.valid_at(temperature)) {
            Some(fit) if temperature <= COLD_BELOW => Ok(fit.at(temperature)),
            Some(fit) => {
                let warm = (temperature - COLD_BELOW) / (ROOM_FROM - COLD_BELOW);
                Ok(warm * room + (1.0 - warm) * fit.at(temperature))
            }
            None if temperature >= COLD_BELOW => Ok(room),
            None => Err(self.fault(temperature, Property::Conductivity)),
        }
    }

    fn contraction_between(&self, from: f64, to: f64) -> Result<f64, ColdFault> {
        let serves = |t: f64| (EXPANSION_SERVES[0]..=EXPANSION_SERVES[1]).contains(&t);
        if serves(from) && serves(to) {
            return Ok(self.expansion * (to - from));
        }
        Ok(self.length_at(to)? - self.length_at(from)?)
    }

    /// (L − L₂₉₃)/L₂₉₃.
    fn length_at(&self, temperature: f64) -> Result<f64, ColdFault> {
        let fault = || self.fault(temperature, Property::Contraction);
        if (REFERENCE..=EXPANSION_SERVES[1]).contains(&temperature) {
            return Ok(self.expansion * (temperature - REFERENCE));
        }
        let table = self.contraction.ok_or_else(fault)?;
        let lowest = table.first().ok_or_else(fault)?;
        if (0.0..=lowest.0).contains(&temperature) {
            // Below 4 K bodies no longer contract by anything that matters (parts in 10⁷).
            return Ok(-lowest.1);
        }
        table
            .windows(2)
            .find(|pair| (pair[0].0..=pair[1].0).contains(&temperature))
            .map(|pair| {
                let share = (temperature - pair[0].0) / (pair[1].0 - pair[0].0);
                -(pair[0].1 + share * (pair[1].1 - pair[0].1))
            })
            .ok_or_else(fault)
    }
}

impl Material {
    fn known(&self) -> Known<'_> {
        Known {
            name: &self.name,
            conductivity: self.conductivity.value,
            fit: self.conductivity_fit.as_ref(),
            expansion: self.expansion.value,
            contraction: self.contraction.as_deref(),
        }
    }

    /// Conductivity at a temperature in K, W/(m K).
    ///
    /// From 250 K up the handbook value, constant; up to 200 K the published fit; a linear blend
    /// between. Without a fit that is valid there, room-temperature data serve down to 200 K and
    /// no further.
    pub fn conductivity_at(&self, temperature: f64) -> Result<f64, ColdFault> {
        self.known().conductivity_at(temperature)
    }

    /// Relative change of length from one temperature to another, 1; negative on cooling.
    ///
    /// ```text
    /// ΔL/L = α (T₂ − T₁)                both within 200 to 450 K
    /// ΔL/L = ε(T₂) − ε(T₁)              otherwise; ε from the table below 293 K, α (T − 293 K) above
    /// ```
    ///
    /// Between the entries of the table the contraction is interpolated linearly; below 4 K it stays.
    pub fn contraction_between(&self, from: f64, to: f64) -> Result<f64, ColdFault> {
        self.known().contraction_between(from, to)
    }
}

impl Grade {
    fn known(&self) -> Known<'_> {
        let like = materials::material(&self.like);
        Known {
            name: &self.name,
            conductivity: self.conductivity.value,
            fit: like.and_then(|like| like.conductivity_fit.as_ref()),
            expansion: self.expansion,
            contraction: like.and_then(|like| like.contraction.as_deref()),
        }
    }

    /// Conductivity of the bolt material at a temperature in K, W/(m K).
    ///
    /// The rule of [`Material::conductivity_at`] with the fit of the material the grade is like.
    pub fn conductivity_at(&self, temperature: f64) -> Result<f64, ColdFault> {
        self.known().conductivity_at(temperature)
    }

    /// Relative change of length of the bolt, 1; negative on cooling.
    ///
    /// The rule of [`Material::contraction_between`] with the table of the material the grade is like.
    pub fn contraction_between(&self, from: f64, to: f64) -> Result<f64, ColdFault> {
        self.known().contraction_between(from, to)
    }
}
