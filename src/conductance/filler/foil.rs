//! A soft foil that yields under the asperities of both faces.

use crate::conductance::{Interface, radiation};

/// Distance of a face from a foil that only lies on it, in its roughness (judgement: the tallest peaks).
const LOOSE: f64 = 3.0;

/// A foil between two rough faces.
///
/// ```text
/// R = t/k + 1/(h_s + h_0)         1/h_s = Σ 1/h_i,   h_i = 1.25 k_i (m_i/σ_i) (P/H)^0.95,   P/H at most 1
/// k_i = 2 k k_face/(k + k_face)
/// ```
///
/// | symbol | quantity | SI unit | argument |
/// |---|---|---|---|
/// | `t`, `k`, `H` | thickness, conductivity, hardness of the foil | m, W/(m K), Pa | |
/// | `m_i`, `σ_i` | slope and roughness of each face; the foil is smooth | 1, m | `interface` |
/// | `P` | pressure | Pa | `pressure` |
/// | `h_0` | medium across the loose faces, 3 (σ₁ + σ₂) apart | W/(m² K) | |
///
/// The asperities of the harder faces sink into the foil, so that its hardness decides. Valid: foil much
/// softer than both faces and thicker than their roughness; P up to H. Above, the boundaries are held; the
/// foil also thins and creeps, which is left out and would lower R.
///
/// Source: plastic contact conductance, Yovanovich 1982; that the hardness of the foil takes the place of
/// that of the face, Yovanovich 1972 (foils in joints), both from memory.
/// Checked: `indium_foil_is_near_its_table`, `foil_falls_to_its_bulk`.
#[derive(Clone, Copy, Debug)]
pub(super) struct Foil {
    pub(super) thickness: f64,
    /// t/k, m² K/W.
    pub(super) bulk: f64,
    /// Distance of the faces beyond the foil where nothing presses, m.
    pub(super) loose: f64,
    hardness: f64,
    /// Both boundaries at P = H, W/(m² K).
    pressed: f64,
    unloaded: f64,
}

impl Foil {
    pub(super) fn between(
        interface: &Interface,
        (thickness, conductivity): (f64, f64),
        hardness: f64,
    ) -> Self {
        let boundaries = interface.faces.iter().map(|face| {
            let pair = 2.0 * conductivity * face.conductivity / (conductivity + face.conductivity);
            (1.25 * pair * face.slope / face.roughness).recip()
        });
        let loose: f64 = LOOSE
            * interface
                .faces
                .iter()
                .map(|face| face.roughness)
                .sum::<f64>();
        let gas = interface
            .gas
            .map_or(0.0, |gas| gas.conductivity / (loose + gas.parameter));
        let emissivity = interface.faces.each_ref().map(|face| face.emissivity);
        Self {
            thickness,
            bulk: thickness / conductivity,
            loose,
            hardness,
            pressed: boundaries.sum::<f64>().recip(),
            unloaded: gas + radiation::conductance(interface.temperature, emissivity),
        }
    }

    /// Area resistance, m² K/W.
    #[inline]
    pub(super) fn resistance(&self, pressure: f64) -> f64 {
        let load = (pressure.max(0.0) / self.hardness).min(1.0);
        self.bulk + (self.pressed * load.powf(0.95) + self.unloaded).recip()
    }
}
