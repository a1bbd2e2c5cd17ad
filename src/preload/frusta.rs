//! Textbook stiffness of bolt and members: frusta of 30°, the fit of Wileman, N/m.

use std::f64::consts::PI;

/// tan 30°, the half-angle of the textbook frusta.
pub const TAN_30: f64 = 0.577_350_269_189_625_8;

/// A frustum of the textbook pressure cone.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Frustum {
    /// Smaller diameter D, m.
    pub diameter: f64,
    /// Thickness t, m.
    pub thickness: f64,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
}

/// Stiffness of a frustum of 30° half-angle around a bolt, N/m.
///
/// ```text
/// k = 0.5774 π E d / ln[ (1.155 t + D − d)(D + d) / ((1.155 t + D + d)(D − d)) ]
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `E` | Young's modulus of the layer | Pa | `youngs_modulus` |
/// | `t` | thickness of the frustum | m | `thickness` |
/// | `D` | diameter of its smaller end | m | `diameter` |
/// | `d` | diameter of the bolt, of the hole as well | m | `bolt_diameter` |
///
/// Valid: a layer wider than the frustum; `D` above `d`.
/// Source: Shigley's Mechanical Engineering Design, chapter 8.
/// Checked: `frusta_of_shigley_8_22_and_8_24`.
pub fn frustum_stiffness(frustum: &Frustum, bolt_diameter: f64) -> f64 {
    let (large, hole) = (frustum.diameter, bolt_diameter);
    let opened = 2.0 * TAN_30 * frustum.thickness + large;
    TAN_30 * PI * frustum.youngs_modulus * hole
        / ((opened - hole) * (large + hole) / ((opened + hole) * (large - hole))).ln()
}

/// Stiffness of members in series, N/m: 1/k = Σ 1/kᵢ.
pub fn in_series(stiffnesses: impl IntoIterator<Item = f64>) -> f64 {
    1.0 / stiffnesses.into_iter().map(f64::recip).sum::<f64>()
}

/// A fit of member stiffness to finite elements.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MemberFit {
    /// Coefficient A, 1.
    pub scale: f64,
    /// Coefficient B, 1.
    pub exponent: f64,
}

impl MemberFit {
    /// Steel.
    pub const STEEL: Self = Self::new(0.78715, 0.62873);
    /// Grey cast iron.
    pub const GREY_IRON: Self = Self::new(0.77871, 0.61616);
    /// Aluminium, from memory.
    pub const ALUMINIUM: Self = Self::new(0.79670, 0.63816);
    /// Copper, from memory.
    pub const COPPER: Self = Self::new(0.79568, 0.63553);
    /// Any metal, from memory.
    pub const GENERAL: Self = Self::new(0.78952, 0.62914);

    const fn new(scale: f64, exponent: f64) -> Self {
        Self { scale, exponent }
    }

    /// Member stiffness per Young's modulus, k/E = A d exp(B d/l), m.
    ///
    /// Valid: one material, washer face 1.5 d.
    /// Source: Wileman, Choudhury & Green 1991, as printed in Shigley, chapter 8.
    /// Checked: `member_fit_of_wileman`.
    pub fn length(&self, bolt: &MemberShape) -> f64 {
        self.scale * bolt.diameter * (self.exponent * bolt.diameter / bolt.grip).exp()
    }
}

/// What the member fit asks of a joint.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MemberShape {
    /// Bolt diameter, m.
    pub diameter: f64,
    /// Grip, m.
    pub grip: f64,
}

/// A bolt as the textbook sees it: plain shank, then thread.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TextbookBolt {
    /// Length and area of the shank, m and m².
    pub shank: [f64; 2],
    /// Length and area of the thread within the grip, m and m².
    pub thread: [f64; 2],
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
}

impl TextbookBolt {
    /// Stiffness, N/m.
    ///
    /// ```text
    /// k = E / (l_d/A_d + l_t/A_t)
    /// ```
    ///
    /// `l_d`, `A_d` are length and area of the plain shank in the grip, `l_t`, `A_t` those of the thread, with its
    /// stress area. Valid: within the grip; head and nut are taken as rigid.
    /// Source: Shigley's Mechanical Engineering Design, chapter 8.
    /// Checked: `frusta_of_shigley_8_22_and_8_24`.
    pub fn stiffness(&self) -> f64 {
        let [shank, thread] = [self.shank, self.thread].map(|[length, area]| length / area);
        self.youngs_modulus / (shank + thread)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// ∫ dz/(E A) over a hollow frustum of 30° by Simpson's rule, m/N.
    fn integrated(frustum: &Frustum, bolt_diameter: f64) -> f64 {
        let steps = 2000;
        let dz = frustum.thickness / f64::from(steps);
        (0..=steps)
            .map(|step| {
                let weight = match step {
                    0 => 1.0,
                    step if step == steps => 1.0,
                    step if step % 2 == 1 => 4.0,
                    _ => 2.0,
                };
                let diameter = frustum.diameter + 2.0 * f64::from(step) * dz / 3f64.sqrt();
                let area = PI / 4.0 * (diameter.powi(2) - bolt_diameter.powi(2));
                weight * dz / 3.0 / (frustum.youngs_modulus * area)
            })
            .sum()
    }

    #[test]
    fn frustum_gives_as_the_sum_of_its_slices() {
        for (diameter, thickness, bolt) in [
            (18e-3, 20e-3, 12e-3),
            (18e-3, 2.5e-3, 11e-3),
            (41e-3, 60e-3, 12e-3),
            (9.4e-3, 12e-3, 6.6e-3),
        ] {
            let frustum = Frustum {
                diameter,
                thickness,
                youngs_modulus: 70e9,
            };
            let product = frustum_stiffness(&frustum, bolt) * integrated(&frustum, bolt);
            // Simpson's rule on 2000 steps of a smooth function: far below 1e-9.
            assert!((product - 1.0).abs() < 1e-9, "{product}");
        }
    }

    #[test]
    fn members_of_shigley_8_22_are_as_printed() {
        // Seen; d 12 mm; smaller diameter and thickness, mm, E, GPa, stiffness, MN/m. Four digits: 0.1 %.
        for (diameter, thickness, modulus, printed) in [
            (18e-3, 20e-3, 207e9, 4470e6),
            (41.09e-3, 2.5e-3, 100e9, 52_230e6),
            (18e-3, 22.5e-3, 100e9, 2074e6),
        ] {
            let frustum = Frustum {
                diameter,
                thickness,
                youngs_modulus: modulus,
            };
            let found = frustum_stiffness(&frustum, 12e-3);
            assert!((found / printed - 1.0).abs() < 1e-3, "{found}");
        }
    }

    #[test]
    fn cutting_a_frustum_changes_nothing() {
        let whole = Frustum {
            diameter: 18e-3,
            thickness: 20e-3,
            youngs_modulus: 207e9,
        };
        let upper = Frustum {
            thickness: 7e-3,
            ..whole
        };
        let lower = Frustum {
            diameter: 18e-3 + 2.0 * TAN_30 * 7e-3,
            thickness: 13e-3,
            ..whole
        };
        let cut = in_series([&upper, &lower].map(|part| frustum_stiffness(part, 12e-3)));
        // The same integral in two parts: rounding alone.
        assert!((cut / frustum_stiffness(&whole, 12e-3) - 1.0).abs() < 1e-12);
    }
}
