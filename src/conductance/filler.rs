//! Paste, pad, foil or table between the faces, in place of spots and gas.

use crate::{conductance::Interface, joint::FillerKind, numerics::interpolation};

/// Exponent of yield stress over pressure in the bond line of a paste.
const BOND_LINE_EXPONENT: f64 = 0.166;

/// Bond line of a paste whose yield stress equals the pressure, m.
const BOND_LINE: f64 = 1.31e-4;

/// Bond line of a filled paste under pressure, m.
///
/// ```text
/// BLT = 1.31e-4 m (τ/P)^0.166
/// ```
///
/// `stress_ratio` is τ/P, yield stress over pressure. Valid: 1e5 to 1e6 Pa; above, the largest filler
/// particle stops it, and [`Filling`] does.
/// Source: Prasher 2002, scaling constants from memory; that yield stress and conductivity are
/// what is needed is seen.
/// Checked: `paste_bond_lines` in `tests/validation_conductance.rs`.
pub fn bond_line(stress_ratio: f64) -> f64 {
    BOND_LINE * stress_ratio.powf(BOND_LINE_EXPONENT)
}

/// A filler that takes the place of spots and gas, ready for any pressure.
#[derive(Clone, Debug)]
pub(crate) struct Filling {
    shape: Shape,
    factor: f64,
}

#[derive(Clone, Debug)]
enum Shape {
    Layer {
        thickness: f64,
        resistance: f64,
    },
    Paste {
        /// Bond line at 1 Pa, m.
        bond_line: f64,
        thinnest: f64,
        applied: f64,
        conductivity: f64,
        /// Half the roughness of both faces, m.
        wetting: f64,
    },
    Table(Vec<(f64, f64)>),
}

impl Filling {
    /// The filling of an interface; none when the spots stay: bare, or with a fluid.
    ///
    /// ```text
    /// layer:  R = t/k + boundary
    /// paste:  R = BLT/k + (σ₁ + σ₂)/(2k),   BLT between the thinnest and the applied bond line
    /// ```
    ///
    /// Source: Prasher 2001, wetted surfaces, from memory.
    pub(crate) fn of(interface: &Interface) -> Option<Self> {
        let shape = match interface.filler.as_ref()? {
            FillerKind::Fluid { .. } => return None,
            FillerKind::Layer {
                conductivity,
                thickness,
                boundary,
            } => Shape::Layer {
                thickness: *thickness,
                resistance: thickness / conductivity + boundary,
            },
            FillerKind::Paste {
                conductivity,
                yield_stress,
                thinnest,
                applied,
            } => Shape::Paste {
                bond_line: bond_line(*yield_stress),
                thinnest: *thinnest,
                applied: *applied,
                conductivity: *conductivity,
                wetting: 0.5
                    * interface
                        .faces
                        .iter()
                        .map(|face| face.roughness)
                        .sum::<f64>(),
            },
            FillerKind::Table { points } => Shape::Table(points.clone()),
        };
        Some(Self {
            shape,
            factor: interface.filler_factor,
        })
    }

    /// Area resistance, m² K/W.
    #[inline]
    pub(crate) fn resistance(&self, pressure: f64) -> f64 {
        self.factor
            * match &self.shape {
                Shape::Layer { resistance, .. } => *resistance,
                Shape::Paste {
                    conductivity,
                    wetting,
                    ..
                } => (self.thickness(pressure) + wetting) / conductivity,
                Shape::Table(points) => interpolation::log_log(points, pressure),
            }
    }

    /// Thickness between the faces, m; zero for a table, which does not know.
    #[inline]
    pub(crate) fn thickness(&self, pressure: f64) -> f64 {
        match &self.shape {
            Shape::Layer { thickness, .. } => *thickness,
            Shape::Paste {
                bond_line,
                thinnest,
                applied,
                ..
            } => {
                if pressure > 0.0 {
                    (bond_line * pressure.powf(-BOND_LINE_EXPONENT))
                        .max(*thinnest)
                        .min(*applied)
                } else {
                    *applied
                }
            }
            Shape::Table(_) => 0.0,
        }
    }

    /// Area resistance where the faces stand `opening` further apart than without load, m² K/W.
    ///
    /// A paste bridges the opening once it is wider than the bond line as applied (assumed: it
    /// is not torn). A pad or foil stays on one face, and the `medium` conductance crosses the
    /// opening.
    pub(crate) fn parted(&self, opening: f64, medium: impl Fn(f64) -> f64) -> f64 {
        match &self.shape {
            Shape::Paste {
                applied,
                conductivity,
                wetting,
                ..
            } => self.factor * (applied.max(opening) + wetting) / conductivity,
            _ if opening > 0.0 => self.resistance(0.0) + medium(opening).recip(),
            _ => self.resistance(0.0),
        }
    }
}
