//! Paste, pad, foil or table between the faces, in place of spots and gas.

mod foil;

use crate::{conductance::Interface, joint::FillerKind, numerics::interpolation};

use foil::Foil;

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
/// particle stops it: the interface keeps the bond line between its bounds.
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
        conductivity: f64,
        boundary: f64,
        /// Pressure over true strain, Pa; none stays as thick as it is.
        modulus: Option<f64>,
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
    Foil(Foil),
    Table(Vec<(f64, f64)>),
}

impl Filling {
    /// The filling of an interface; none when the spots stay: bare, or with a fluid.
    ///
    /// ```text
    /// layer:  R = t/k + boundary,   t = t₀ exp(−p/M) where its modulus M and the pressure on it are known
    /// foil:   R = t/k + 1/h of its two boundaries, see [`Foil`]
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
                conductivity: *conductivity,
                boundary: *boundary,
                modulus: interface.filler_modulus,
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
            FillerKind::Foil {
                conductivity,
                thickness,
                hardness,
            } => Shape::Foil(Foil::between(
                interface,
                (*thickness, *conductivity),
                *hardness,
            )),
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
                Shape::Layer {
                    conductivity,
                    boundary,
                    ..
                } => self.thickness(pressure) / conductivity + boundary,
                Shape::Paste {
                    conductivity,
                    wetting,
                    ..
                } => (self.thickness(pressure) + wetting) / conductivity,
                Shape::Foil(foil) => foil.resistance(pressure),
                Shape::Table(points) => interpolation::log_log(points, pressure),
            }
    }

    /// Thickness between the faces, m; zero for a table, which does not know.
    #[inline]
    pub(crate) fn thickness(&self, pressure: f64) -> f64 {
        match &self.shape {
            // Closure p/M of the thickness that is left: −dt/t = dp/M, and it never turns negative.
            Shape::Layer {
                thickness, modulus, ..
            } => modulus.map_or(*thickness, |modulus| {
                thickness * (-pressure.max(0.0) / modulus).exp()
            }),
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
            Shape::Foil(foil) => foil.thickness,
            Shape::Table(_) => 0.0,
        }
    }

    /// Area resistance where the faces stand `opening` (m) further apart than where they meet, m² K/W.
    ///
    /// A paste that nothing presses keeps its thickness as applied (judgement: fresh paste; it creeps
    /// out in time and then conducts better) and fills an opening of no more than that: the `medium`
    /// conductance crosses what is wider. One of stated bond line, applied as thick as it is thin, was
    /// squeezed to it and fills as much again (judgement). A pad or foil stays on one face, and the
    /// medium crosses the opening.
    ///
    /// ```text
    /// BLT = b + min(g, a), at least a, at most max(a, 2 b)      b thinnest, a applied, g opening
    /// ```
    pub(crate) fn parted(&self, opening: f64, medium: impl Fn(f64) -> f64) -> f64 {
        let open = |gap: f64| if gap > 0.0 { medium(gap).recip() } else { 0.0 };
        match &self.shape {
            Shape::Paste {
                thinnest,
                applied,
                conductivity,
                wetting,
                ..
            } => {
                let filled = (thinnest + opening.min(*applied))
                    .max(*applied)
                    .min(applied.max(2.0 * thinnest));
                self.factor * (filled + wetting) / conductivity + open(opening - applied)
            }
            Shape::Foil(foil) => self.factor * foil.bulk + open(opening + foil.loose),
            _ => self.resistance(0.0) + open(opening),
        }
    }
}
