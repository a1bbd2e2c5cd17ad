//! The spots of one interface, ready for any pressure.

use crate::{
    conductance::{
        Face, Hardness, Interface,
        film::{self, Coated},
        spots::{
            Asperities, Mode, REFERENCE_LOAD, Surfaces, harmonic_mean, mode::carried, plastic_fit,
        },
    },
    joint::Law,
};

/// Exponent by which the diagonal of the indentation grows with load, in units of c₂.
const INDENTATION_GROWTH: f64 = 0.071;

/// The spots of an interface.
#[derive(Clone, Debug)]
pub(crate) struct Spots {
    /// The two faces as one; conductivity with coatings.
    pub(crate) surfaces: Surfaces,
    law: Law,
    hardness: [HardnessCurve; 2],
    /// k m/σ times the scatter factor, W/(m² K).
    scale: f64,
    /// What a hardness that does not depend on pressure leaves to do.
    fixed: Option<Fixed>,
}

/// Contact hardness against pressure: `coefficient · Pᵉˣᵖᵒⁿᵉⁿᵗ`.
#[derive(Clone, Copy, Debug)]
struct HardnessCurve {
    coefficient: f64,
    exponent: f64,
}

#[derive(Clone, Copy, Debug)]
struct Fixed {
    overlap_per_pressure: f64,
    touching_per_pressure: f64,
    load_per_pressure: f64,
    scale: f64,
}

impl Spots {
    pub(crate) fn of(interface: &Interface) -> Self {
        let mut surfaces = Surfaces::of(&interface.faces);
        let bare = surfaces;
        let coated = interface.faces.each_ref().map(|face| coated(face, &bare));
        surfaces.conductivity = harmonic_mean([coated[0].0, coated[1].0]);
        let mut spots = Self {
            surfaces,
            law: interface.law,
            hardness: [coated[0].1, coated[1].1],
            scale: interface.solid_factor * surfaces.conductivity * surfaces.slope
                / surfaces.roughness,
            fixed: None,
        };
        if spots
            .hardness
            .iter()
            .all(|curve| curve.exponent.abs() < 1e-12)
        {
            spots.fixed = Some(spots.fixed_at(1.0));
        }
        spots
    }

    /// Conductance of the spots, W/(m² K).
    #[inline]
    pub(crate) fn conductance(&self, pressure: f64) -> f64 {
        if pressure <= 0.0 {
            return 0.0;
        }
        let fixed = self.fixed_for(pressure);
        fixed.scale
            * match self.law {
                Law::PlasticPower => plastic_fit(pressure * fixed.load_per_pressure),
                _ => carried(
                    pressure * fixed.overlap_per_pressure,
                    pressure * fixed.touching_per_pressure,
                ),
            }
    }

    /// Pressure over the contact hardness of the softer face, 1.
    #[inline]
    pub(crate) fn load(&self, pressure: f64) -> f64 {
        if pressure <= 0.0 {
            return 0.0;
        }
        match &self.fixed {
            Some(fixed) => pressure * fixed.load_per_pressure,
            None => pressure / self.softer(pressure),
        }
    }

    /// Share of the apparent area at which the asperities overlap; ½ is where the laws end.
    pub(crate) fn overlap(&self, pressure: f64) -> f64 {
        pressure * self.fixed_for(pressure).overlap_per_pressure
    }

    /// The asperities at a pressure.
    pub(crate) fn asperities(&self, pressure: f64) -> Asperities {
        Asperities {
            slope: self.surfaces.slope,
            elastic_modulus: self.surfaces.elastic_modulus,
            hardness: self.softer(pressure),
        }
    }

    #[inline]
    fn fixed_for(&self, pressure: f64) -> Fixed {
        self.fixed.unwrap_or_else(|| self.fixed_at(pressure))
    }

    fn fixed_at(&self, pressure: f64) -> Fixed {
        let asperities = self.asperities(pressure);
        let Mode {
            hardness,
            area_factor,
            ..
        } = asperities.mode(self.law);
        Fixed {
            overlap_per_pressure: (area_factor * hardness).recip(),
            touching_per_pressure: hardness.recip(),
            load_per_pressure: asperities.hardness.recip(),
            scale: self.scale * area_factor.sqrt(),
        }
    }

    fn softer(&self, pressure: f64) -> f64 {
        self.hardness[0]
            .at(pressure)
            .min(self.hardness[1].at(pressure))
    }
}

impl HardnessCurve {
    /// The curve of a bare face against the joint's asperities.
    ///
    /// ```text
    /// P/H_c = [P / (c₁ (1.62 σ/m)^c₂)]^(1/(1 + 0.071 c₂)),   σ in µm
    /// ```
    ///
    /// Source: the form c₁ (1.62 σ/m)^c₂ in J. Thermophys. Heat Transfer 18(3), 2004; the exponent
    /// from memory.
    /// Checked: `stainless_pair_by_microhardness` in `tests/validation_conductance.rs`.
    fn of(hardness: Hardness, surfaces: &Surfaces) -> Self {
        match hardness {
            Hardness::Meyer(coefficient) => Self {
                coefficient,
                exponent: 0.0,
            },
            Hardness::Micro { c1, c2 } => {
                let diagonal = 1.62 * surfaces.roughness * 1e6 / surfaces.slope;
                let power = (1.0 + INDENTATION_GROWTH * c2).recip();
                Self {
                    coefficient: (c1 * diagonal.powf(c2)).powf(power),
                    exponent: 1.0 - power,
                }
            }
        }
    }

    fn at(self, pressure: f64) -> f64 {
        if self.exponent == 0.0 {
            self.coefficient
        } else {
            self.coefficient * pressure.powf(self.exponent)
        }
    }

    /// Hardness where pressure over hardness is [`REFERENCE_LOAD`]: P = X H(P).
    fn at_reference_load(self) -> f64 {
        let pressure = (REFERENCE_LOAD * self.coefficient).powf((1.0 - self.exponent).recip());
        self.at(pressure)
    }
}

/// Conductivity at the spots, and hardness, of a face with what lies on it.
fn coated(face: &Face, surfaces: &Surfaces) -> (f64, HardnessCurve) {
    let bare = HardnessCurve::of(face.hardness, surfaces);
    let Some(layer) = &face.coating else {
        return (face.conductivity, bare);
    };
    let coated = Coated {
        layer: *layer,
        substrate_hardness: bare.at_reference_load(),
        substrate_conductivity: face.conductivity,
        spot_radius: surfaces.spot_radius(REFERENCE_LOAD),
    };
    let hardness = film::hardness(&coated).map_or(bare, |coefficient| HardnessCurve {
        coefficient,
        exponent: 0.0,
    });
    (film::conductivity(&coated), hardness)
}
