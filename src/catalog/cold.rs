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
    /// Range in which it is known, away from room temperature when asked for the cold, K.
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

impl ColdFault {
    /// Whether the data end below the temperature: they lack the heat, not the cold.
    pub fn is_hot(&self) -> bool {
        self.temperature > EXPANSION_SERVES[1]
    }
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
        if let Some([_, end]) = self.known.filter(|_| self.is_hot()) {
            return write!(
                out,
                "the expansion of {material} is not known at {temperature:.0} K: its coefficient \
                 serves up to {end:.0} K"
            );
        }
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
                Property::Contraction if temperature > EXPANSION_SERVES[1] => {
                    Some(EXPANSION_SERVES)
                }
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
        if self.contraction.is_none() && serves(from) && serves(to) {
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

#[cfg(test)]
mod tests {

    use crate::catalog::{grade, grades, material, materials};

    /// Relative deviation from an expected value.
    fn off(found: f64, expected: f64) -> f64 {
        (found / expected - 1.0).abs()
    }

    #[test]
    fn conductivity_goes_from_the_fit_to_the_handbook_without_a_step() {
        for material in materials() {
            let mut last = None;
            for temperature in (160..=320).map(f64::from) {
                let now = material.conductivity_at(temperature).ok();
                if let (Some(last), Some(now)) = (last, now) {
                    // 36 % of difference blended over 50 K, plus the slope of the fit itself.
                    let off: f64 = off(now, last);
                    assert!(off < 0.015, "{} at {temperature} K: {off}", material.name);
                }
                last = now;
            }
            assert_eq!(
                material.conductivity_at(293.15),
                Ok(material.conductivity.value),
                "{}",
                material.name
            );
        }
    }

    #[test]
    fn contraction_has_the_slope_of_the_room_temperature_expansion() {
        for material in materials() {
            let Some(table) = &material.contraction else {
                continue;
            };
            // Expansion itself falls by some 6 % from 293 K to the middle of the last interval and
            // sheets differ by as much; PTFE changes its crystal form near 292 K, and one digit of the
            // table is a third of what is left of Fe-36Ni.
            let limit = match material.name.as_str() {
                "PTFE" | "Fe-36Ni" => 1.0,
                _ => 0.15,
            };
            let (temperature, contraction) = table[table.len() - 2];
            let slope = contraction / (293.0 - temperature);
            let off = off(slope, material.expansion.value);
            assert!(off < limit, "{}: {off}", material.name);
        }
    }

    #[test]
    fn contraction_adds_up_and_changes_sign_on_the_way_back() {
        for name in ["Al 6061-T6", "304", "Cu OFHC", "PTFE"] {
            let body = material(name).unwrap();
            let between = |from, to| body.contraction_between(from, to).unwrap();
            assert!(between(293.0, 77.0) < 0.0);
            assert!((between(293.0, 77.0) + between(77.0, 293.0)).abs() < 1e-15);
            let parts = between(350.0, 293.0) + between(293.0, 20.0) + between(20.0, 4.0);
            // The parts are sums of the same few numbers.
            assert!((parts - between(350.0, 4.0)).abs() < 1e-12, "{name}");
        }
        // Nothing contracts any more below 4 K: copper keeps its 0.324 %.
        let copper = material("Cu OFHC").unwrap();
        let found = copper.contraction_between(293.0, 1.5).unwrap();
        assert!((found + 0.00324).abs() < 1e-9);
        // Published tables of integrated contraction, from memory; 77 K is an entry.
        let aluminium = material("Al 6061-T6").unwrap();
        let found = aluminium.contraction_between(293.0, 77.0).unwrap();
        assert!((found + 0.00391).abs() < 1e-9);
    }

    #[test]
    fn the_cold_is_refused_where_nothing_is_known() {
        let alloy = material("Al 7075-T73").unwrap();
        let fault = alloy.conductivity_at(120.0).unwrap_err();
        assert_eq!(
            fault.to_string(),
            "the conductivity of Al 7075-T73 is not known at 120 K: there is no curve k(T) of it, \
             and room-temperature data do not serve in the cold"
        );
        assert!(alloy.conductivity_at(200.0).is_ok());
        let alloy = material("CuBe2").unwrap();
        let fault = alloy.conductivity_at(120.0).unwrap_err();
        assert_eq!(
            fault.to_string(),
            "the conductivity of CuBe2 is not known at 120 K: its curve k(T) runs from 2 to 80 K, \
             and room-temperature data do not serve in the cold"
        );
        let ceramic = material("Alumina 96 %").unwrap();
        let fault = ceramic.contraction_between(293.0, 150.0).unwrap_err();
        assert_eq!(
            fault.to_string(),
            "the contraction of Alumina 96 % is not known at 150 K: there is no table ΔL/L(T) of it, \
             and room-temperature data do not serve in the cold"
        );
        assert!(ceramic.contraction_between(293.0, 220.0).is_ok());
    }

    #[test]
    fn the_heat_is_refused_in_its_own_words() {
        for name in ["Al 6061-T6", "Alumina 96 %"] {
            let fault = material(name).unwrap().contraction_between(293.0, 1273.0);
            assert_eq!(
                fault.unwrap_err().to_string(),
                format!(
                    "the expansion of {name} is not known at 1273 K: its coefficient serves up to 450 K"
                )
            );
        }
    }

    #[test]
    fn bolts_follow_the_material_they_are_like() {
        let bolt = grade("A2-70", 0.005).unwrap();
        let like = material("304").unwrap();
        assert_eq!(bolt.conductivity_at(77.0), like.conductivity_at(77.0));
        assert_eq!(
            bolt.contraction_between(293.0, 77.0),
            like.contraction_between(293.0, 77.0)
        );
        assert_eq!(bolt.conductivity_at(300.0), Ok(16.2));
        let bolt = grade("8.8", 0.005).unwrap();
        let fault = bolt.conductivity_at(77.0).unwrap_err();
        assert!(fault.to_string().contains("conductivity of 8.8"));
        // Iron, from memory: 0.190 % to 77 K.
        let found = bolt.contraction_between(293.0, 77.0).unwrap();
        assert!((found + 0.0019).abs() < 1e-9);
    }

    #[test]
    fn bolts_are_like_a_material_of_their_own_kind() {
        for bolt in grades() {
            let like = material(&bolt.like).unwrap();
            // Grades of one kind of steel differ by less than a tenth; copper for stainless would not pass.
            let conductivity = off(bolt.conductivity.value, like.conductivity.value);
            let expansion = off(bolt.expansion, like.expansion.value);
            assert!(conductivity < 0.10 && expansion < 0.10, "{}", bolt.name);
        }
    }
}
