//! What a plate of ceramic, glass or a semiconductor bears: tension beside the seat, bending flat.

use crate::{catalog::MaterialKind, joint::Plate};

/// Least strength over stress of a brittle plate, 1.
///
/// Judgement: strengths of brittle parts scatter by a third and fall with size, scratches and time under
/// load; makers ask for 2 to 4 (common practice, no source).
pub const SAFETY: f64 = 3.0;

/// Tension beside a seat that presses with a mean pressure, Pa.
///
/// ```text
/// σ = (1 − 2ν)/3 p_max,   p_max = 3/2 p_mean
/// ```
///
/// Valid: a rounded edge, the stress of a Hertz contact just outside it; a sharp edge or a grain under the
/// head is far worse.
/// Source: Johnson, Contact Mechanics, from memory. Checked: `seat_of_an_m3_on_a_ceramic`.
pub fn tension_beside_seat(pressure: f64, poisson: f64) -> f64 {
    0.5 * (1.0 - 2.0 * poisson) * pressure
}

/// Bending stress of a plate that is pressed flat from a dish or dome, Pa.
///
/// ```text
/// σ = E t κ/(2 (1 − ν)),   κ = 8 h/L²
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `E`, `ν`, `t` | of the plate | Pa, 1, m | `plate` |
/// | `h` | out-of-flatness of both faces together | m | `height` |
/// | `L` | shorter side of the plate, which bounds the stress from above | m | `plate` |
///
/// Valid: thin plate, bent alike in both directions, pressed flat entirely by a stiff partner.
/// Source: plate theory, spherical bending. Checked: `flattening_of_a_disc_against_plate_theory`.
pub fn flattening_stress(plate: &Plate, height: f64) -> f64 {
    let [left, lower, right, upper] = plate.outline.bounds();
    let span = (right - left).min(upper - lower);
    let material = &plate.material;
    4.0 * material.youngs_modulus.value * plate.thickness * height
        / ((1.0 - material.poisson.value) * span * span)
}

/// The stresses of a brittle plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BrittleStress {
    /// Tension beside the seat at the highest force, Pa; none where no head or nut sits on it.
    pub seat: Option<f64>,
    /// Bending from being pressed flat, Pa; none where no flatness is stated.
    pub bending: Option<f64>,
    /// Stated strength in bending, Pa.
    pub strength: Option<f64>,
}

impl BrittleStress {
    /// Stress over strength, 1, where the strength is stated.
    pub fn used(&self) -> Option<f64> {
        let stress = self.seat.unwrap_or(0.0) + self.bending.unwrap_or(0.0);
        self.strength.map(|strength| stress / strength)
    }
}

/// Whether a plate is of a brittle material.
pub fn is_brittle(plate: &Plate) -> bool {
    plate.material.kind == MaterialKind::Brittle || plate.flexural_strength.is_some()
}

/// Mean pressure under a seat that a brittle plate of stated strength may bear, Pa.
///
/// What bending takes of the strength is taken off first; nothing is left where it takes all.
pub fn seat_limit(plate: &Plate, height: Option<f64>) -> Option<f64> {
    let strength = plate.flexural_strength.filter(|_| is_brittle(plate))?;
    let bending = height.map_or(0.0, |height| flattening_stress(plate, height));
    let unit = tension_beside_seat(1.0, plate.material.poisson.value);
    Some((strength / SAFETY - bending).max(0.0) / unit)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::preload::fixture::joint;

    fn ceramic() -> Plate {
        let mut plate = joint().plates.swap_remove(0);
        plate.material.kind = MaterialKind::Brittle;
        plate.material.youngs_modulus.value = 320e9;
        plate.material.poisson.value = 0.24;
        plate.thickness = 1e-3;
        plate.outline = crate::joint::Outline::Disc { radius: 25e-3 };
        plate
    }

    #[test]
    fn seat_of_an_m3_on_a_ceramic() {
        // ν 0.24: (1 − 0.48)/2 = 0.26 of the mean pressure.
        assert!((tension_beside_seat(100e6, 0.24) / 26e6 - 1.0).abs() < 1e-9);
    }

    #[test]
    fn flattening_of_a_disc_against_plate_theory() {
        // A disc bent by the edge moment M: w = M a²/(2 D (1 + ν)), σ = 6 M/t², D = E t³/(12 (1 − ν²)).
        let (plate, height) = (ceramic(), 20e-6);
        let (modulus, poisson, thickness, radius) = (320e9, 0.24, 1e-3, 25e-3_f64);
        let rigidity = modulus * f64::powi(thickness, 3) / (12.0 * (1.0 - poisson * poisson));
        let moment = height * 2.0 * rigidity * (1.0 + poisson) / radius.powi(2);
        let stress = 6.0 * moment / thickness.powi(2);
        let found = flattening_stress(&plate, height);
        // The same theory twice: rounding alone.
        assert!((found / stress - 1.0).abs() < 1e-9, "{found} {stress}");
    }

    #[test]
    fn both_stresses_use_the_strength_together() {
        let stress = BrittleStress {
            seat: Some(30e6),
            bending: Some(20e6),
            strength: Some(200e6),
        };
        assert_eq!(stress.used(), Some(0.25));
        let unbent = BrittleStress {
            bending: None,
            ..stress
        };
        assert_eq!(unbent.used(), Some(0.15));
        let unstated = BrittleStress {
            strength: None,
            ..stress
        };
        assert_eq!(unstated.used(), None);
    }

    #[test]
    fn bending_takes_its_part_of_what_the_seat_may_bear() {
        let mut plate = ceramic();
        assert_eq!(seat_limit(&plate, None), None);
        plate.flexural_strength = Some(300e6);
        // A third of 300 MPa over 0.26.
        let free = seat_limit(&plate, None).unwrap();
        assert!((free / (100e6 / 0.26) - 1.0).abs() < 1e-9);
        let bent = seat_limit(&plate, Some(10e-6)).unwrap();
        let taken = flattening_stress(&plate, 10e-6) / 0.26;
        assert!((free - bent - taken).abs() < 1.0);
        assert!(seat_limit(&plate, Some(1e-3)).unwrap().abs() < f64::EPSILON);
    }
}
