//! Platings and films: the hardness and conductivity a spot meets, and the layer's own resistance.

use std::f64::consts::{FRAC_2_PI, PI};

use crate::conductance::{Interface, Layer};

/// Thickness over indentation depth above which the layer alone decides the hardness.
const THICK_LAYER: f64 = 4.90;

/// A layer on a substrate, with the size of the spots that press on it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Coated {
    /// The layer.
    pub layer: Layer,
    /// Hardness below the layer, Pa.
    pub substrate_hardness: f64,
    /// Conductivity below the layer, W/(m K).
    pub substrate_conductivity: f64,
    /// Mean radius of the spots, m.
    pub spot_radius: f64,
}

impl Coated {
    /// Depth of the Vickers indentation that covers the area of a spot, m.
    ///
    /// ```text
    /// d²/2 = π a²,   depth = d/7
    /// ```
    ///
    /// The spot is that of a load of 10⁻³ of the hardness, whatever the pressure: a depth that
    /// grew with pressure would let the conductance of thin soft layers fall with load.
    /// Valid: one depth for every pressure, that of light load.
    /// Source: geometry of the Vickers pyramid; its use here is a judgement.
    pub fn indentation_depth(&self) -> f64 {
        (2.0 * PI).sqrt() * self.spot_radius / 7.0
    }
}

/// Hardness of a soft metal layer on a harder substrate, Pa.
///
/// ```text
/// t/d < 1:         H = H_s (1 − t/d) + 1.81 H_l t/d
/// t/d 1 … 4.90:    H = 1.81 H_l − 0.21 H_l (t/d − 1)
/// t/d > 4.90:      H = H_l
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `t` | thickness of the layer | m | `layer.thickness` |
/// | `d` | depth of indentation | m | `indentation_depth` |
/// | `H_s`, `H_l` | hardness of substrate, of layer | Pa | `substrate_hardness`, `layer.hardness` |
///
/// None when the layer states no hardness. Valid: silver on nickel; steps by 0.9 % at 4.90.
/// Source: Antonetti & Yovanovich 1985, J. Heat Transfer 107, 513, rule from memory; its 61 points
/// scatter by 12.6 % RMS.
/// Checked: `layer_hardness_is_continuous` in `tests/validation_conductance.rs`.
pub fn soft_layer_hardness(coated: &Coated) -> Option<f64> {
    let layer = coated.layer.hardness?;
    let ratio = coated.layer.thickness / coated.indentation_depth();
    Some(if ratio < 1.0 {
        coated.substrate_hardness * (1.0 - ratio) + 1.81 * layer * ratio
    } else if ratio <= THICK_LAYER {
        1.81 * layer - 0.21 * layer * (ratio - 1.0)
    } else {
        layer
    })
}

/// Hardness of a coated face, Pa; none when the layer states no hardness.
///
/// The rule of [`soft_layer_hardness`], kept between the hardness of the layer and that of the
/// substrate: for a layer nearly as hard as the substrate, or harder, the published rule leaves
/// that interval. The bound is a judgement.
///
/// Checked: `coated_hardness_lies_between_layer_and_substrate`.
pub fn hardness(coated: &Coated) -> Option<f64> {
    let (layer, substrate) = (coated.layer.hardness?, coated.substrate_hardness);
    soft_layer_hardness(coated)
        .map(|hardness| hardness.clamp(layer.min(substrate), layer.max(substrate)))
}

/// Conductivity that the constriction below a spot meets, W/(m K).
///
/// ```text
/// 1/k = w/k_l + (1 − w)/k_s,   w = (2/π) arctan(t/a)
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `t` | thickness of the layer; for a film less the depth of indentation, which breaks it | m | `layer.thickness` |
/// | `a` | mean spot radius | m | `spot_radius` |
/// | `k_l`, `k_s` | conductivity of layer, of substrate | W/(m K) | |
///
/// `w` is the share of the temperature drop on the axis of an isothermal spot that falls within
/// the depth `t`. Valid: one layer on a substrate. Exact for a thick layer, for none, and for equal conductivities; between, the
/// closest simple form.
/// Source: derived for this program from the field of an isothermal disc.
/// Checked: `spot_conductivity_has_its_limits`.
pub fn conductivity(coated: &Coated) -> f64 {
    let layer = &coated.layer;
    let depth = if layer.metal {
        layer.thickness
    } else {
        (layer.thickness - coated.indentation_depth()).max(0.0)
    };
    let share = FRAC_2_PI * (depth / coated.spot_radius).atan();
    (share / layer.conductivity + (1.0 - share) / coated.substrate_conductivity).recip()
}

/// Resistance of the layers of both faces to uniform flow, m² K/W: the sum of t/k.
pub fn resistance(interface: &Interface) -> f64 {
    interface
        .faces
        .iter()
        .filter_map(|face| face.coating)
        .map(|layer| layer.thickness / layer.conductivity)
        .fold(0.0, |sum, part| sum + part)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn coated(thickness: f64, hardness: f64, metal: bool) -> Coated {
        Coated {
            layer: Layer {
                thickness,
                conductivity: 10.0,
                hardness: Some(hardness),
                metal,
            },
            substrate_hardness: 1e9,
            substrate_conductivity: 160.0,
            spot_radius: 3e-6,
        }
    }

    #[test]
    fn coated_hardness_lies_between_layer_and_substrate() {
        for layer in [1e7, 4e8, 9e8, 1.1e9, 5e9] {
            let mut before = 1e9;
            for step in 0..200 {
                let thickness = f64::from(step) * 5e-8;
                let found = hardness(&coated(thickness, layer, true)).unwrap();
                assert!(found >= layer.min(1e9) && found <= layer.max(1e9));
                // A step of 1/20 of the depth changes the rule by a twentieth at most.
                assert!((found - before).abs() < 0.06 * f64::max(1e9, 1.81 * layer));
                before = found;
            }
            assert!((before / layer - 1.0).abs() < 1e-12);
        }
        let mut bare = coated(1e-6, 1e9, false);
        bare.layer.hardness = None;
        assert_eq!(hardness(&bare), None);
    }

    // The limits are exact; 1 % at a thousand radii is the tail of the arctangent.
    #[test]
    fn spot_conductivity_has_its_limits() {
        assert!((conductivity(&coated(0.0, 1e9, true)) - 160.0).abs() < 1e-12);
        assert!((conductivity(&coated(3e-3, 1e9, true)) / 10.0 - 1.0).abs() < 0.01);
        let broken = coated(1e-8, 1e9, false);
        assert!((conductivity(&broken) - 160.0).abs() < 1e-12);
        let mut equal = coated(2e-6, 1e9, true);
        equal.layer.conductivity = 160.0;
        assert!((conductivity(&equal) - 160.0).abs() < 1e-12);
    }
}
