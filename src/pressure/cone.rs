//! Contact pressure of one bolt in closed form: where contact ends and how pressure falls.

use std::f64::consts::PI;

use crate::{
    diagnostic::Caution,
    joint::{ConeRule, ConeShape},
    numerics::roots,
    pressure::beta::{beta_share, ln_beta},
};

/// Two plates clamped by one bolt, as the closed form sees them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pair {
    /// Radius where contact begins: the larger hole, m.
    pub hole_radius: f64,
    /// Outer radius of the annulus that the head presses, m.
    pub bearing_radius: f64,
    /// Radius at which the plates end, m; infinite for wide plates.
    pub rim_radius: f64,
    /// Thickness of both plates, m.
    pub thickness: [f64; 2],
    /// E/(1 − ν²) of both plates, Pa.
    pub plane_modulus: [f64; 2],
}

/// Shape of the pressure over x = (r − a)/(c − a), 1 at the hole.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Profile {
    /// (1 − x^α)^β; the straight taper is α = β = 1.
    Power {
        /// Exponent α of the radius, 1.
        radial: f64,
        /// Exponent β of the fall, 1.
        fall: f64,
    },
    /// One pressure up to the contact edge.
    Uniform,
    /// (1 − x)³ (1 + 3x): no value, slope or curvature at the edge, no slope at the hole.
    Quartic,
}

/// Pressure between the plates around one bolt, per unit of clamp force.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cone {
    /// Radius where contact begins, m.
    pub hole_radius: f64,
    /// Outer radius of the head's annulus, m.
    pub bearing_radius: f64,
    /// Radius where contact ends, m.
    pub contact_radius: f64,
    /// Angle between the bolt axis and the line from head edge to contact edge through the
    /// thinner plate, rad.
    pub half_angle: f64,
    /// Shape of the pressure.
    pub profile: Profile,
    /// Pressure at the hole over the clamp force, 1/m².
    pub peak_per_force: f64,
}

/// Effective thickness over bearing radius within which the fitted law was checked.
const THICKNESS_RANGE: [f64; 2] = [0.15, 4.0];
/// Bearing radius over hole radius within which the fitted law was checked.
const BEARING_RANGE: [f64; 2] = [1.25, 2.6];
/// Largest ratio of the two thicknesses within which the fitted law was checked.
const THICKNESS_RATIO: f64 = 6.0;
/// Largest ratio of the two moduli, either way, within which the fitted law was checked.
const MODULUS_RATIO: f64 = 3.0;
/// Room for rounding in a ratio that stands exactly on the end of its range.
const ROUNDING: f64 = 1e-9;

impl Pair {
    fn thinner(&self) -> f64 {
        self.thickness[0].min(self.thickness[1])
    }

    /// Thickness of the equal plates that would carry the same field, m.
    ///
    /// ```text
    /// t_e = t_min [1 + 1.5/(1 + 1.75 κ) (1 − t_min/t_max)],   κ = E′_thick/E′_thin
    /// ```
    ///
    /// Valid: thicknesses up to 1 : 6, 1/3 ≤ κ ≤ 3.
    /// Source: fitted to this project's finite-element solutions of the unilateral contact of two
    /// annular plates.
    pub fn effective_thickness(&self) -> f64 {
        let [t1, t2] = self.thickness;
        let [e1, e2] = self.plane_modulus;
        let (thin, thick, kappa) = if t1 <= t2 {
            (t1, t2, e2 / e1)
        } else {
            (t2, t1, e1 / e2)
        };
        thin * (1.0 + 1.5 / (1.0 + 1.75 * kappa) * (1.0 - thin / thick))
    }

    /// Exponents α and β of the fitted shape (1 − x^α)^β.
    ///
    /// ```text
    /// α = 0.90 + 8.2 exp(−4 v²)
    /// β = 1.03 − 0.39 a/b + 0.115 ln(max(u, 0.6)/0.6) + 0.36 exp(−(v/0.62)³)
    /// u = t_e/b,   v = t_e/(b − a)
    /// ```
    ///
    /// Source: as [`Pair::effective_thickness`].
    fn fitted_profile(&self) -> Profile {
        let (a, b, te) = (
            self.hole_radius,
            self.bearing_radius,
            self.effective_thickness(),
        );
        let (u, v) = (te / b, te / (b - a));
        Profile::Power {
            radial: 0.90 + 8.2 * (-4.0 * v * v).exp(),
            fall: 1.03 - 0.39 * a / b
                + 0.115 * (u.max(0.6) / 0.6).ln()
                + 0.36 * (-(v / 0.62).powi(3)).exp(),
        }
    }

    /// Radius where contact ends by one of the rules, before the rim cuts it, m.
    ///
    /// ```text
    /// fitted:     c = b + t_e max(0.50 − 0.20 a/b, 0.52 − 0.12 a/b + 0.27 ln(t_e/b))
    /// half-angle: c = b + t_min tan φ
    /// VDI:        c = b + t_min tan φ,  tan φ = 0.362 + 0.032 ln(β_L/2) + 0.153 ln y
    ///             β_L = (t1 + t2)/(2b),  y = R_o/b
    /// ```
    ///
    /// Source: fitted, as [`Pair::effective_thickness`]; VDI 2230 through bolt, coefficients from
    /// memory. Wide plates enter the VDI angle with y = 6, where the reference solutions stand.
    fn unbounded_radius(&self, rule: ConeRule) -> f64 {
        const WIDE_PLATE: f64 = 6.0;
        let (b, te) = (self.bearing_radius, self.effective_thickness());
        let s = self.hole_radius / b;
        match rule {
            ConeRule::Fitted => {
                b + te * (0.50 - 0.20 * s).max(0.52 - 0.12 * s + 0.27 * (te / b).ln())
            }
            ConeRule::HalfAngle(angle) => b + self.thinner() * angle.tan(),
            ConeRule::Vdi => {
                let slenderness = (self.thickness[0] + self.thickness[1]) / (2.0 * b);
                let width = if self.rim_radius.is_finite() {
                    self.rim_radius / b
                } else {
                    WIDE_PLATE
                };
                let tangent = 0.362 + 0.032 * (slenderness / 2.0).ln() + 0.153 * width.ln();
                b + self.thinner() * tangent.max(0.0)
            }
        }
    }

    /// The caution `pressure/cone-range` where the fitted law leaves the range it was checked in.
    pub fn caution(&self) -> Option<Caution> {
        let mut outside = Vec::new();
        let mut check = |ratio: f64, [low, high]: [f64; 2], what: &str| {
            if !(low * (1.0 - ROUNDING) <= ratio && ratio <= high * (1.0 + ROUNDING)) {
                outside.push(format!(
                    "{what} is {ratio:.3} (checked {low:.3} to {high:.3})"
                ));
            }
        };
        check(
            self.effective_thickness() / self.bearing_radius,
            THICKNESS_RANGE,
            "effective thickness over bearing radius",
        );
        check(
            self.bearing_radius / self.hole_radius,
            BEARING_RANGE,
            "bearing radius over hole radius",
        );
        let [t1, t2] = self.thickness;
        check(
            t1.max(t2) / t1.min(t2),
            [1.0, THICKNESS_RATIO],
            "ratio of the thicknesses",
        );
        check(
            self.plane_modulus[1] / self.plane_modulus[0],
            [1.0 / MODULUS_RATIO, MODULUS_RATIO],
            "ratio of the moduli",
        );
        (!outside.is_empty()).then(|| Caution {
            code: "pressure/cone-range",
            text: format!(
                "the closed-form pressure field is outside the range it was checked in: {}",
                outside.join("; ")
            ),
        })
    }
}

/// The field of one bolt between two plates.
///
/// Accuracy of the fitted law over 43 reference solutions: contact radius within 4 %, ring sum of
/// p^0.95 within 0.6 %. The fitted shape depends on radii of hole and head and on `t_e` alone, so it can stand on any
/// contact radius; it was checked on the fitted one.
/// Checked: `closed_form_stays_near_the_reference_solutions`, `field_carries_the_force`.
pub fn cone(pair: &Pair, rule: ConeRule, shape: ConeShape) -> Cone {
    let contact_radius = pair.unbounded_radius(rule).min(pair.rim_radius);
    let mut cone = Cone {
        hole_radius: pair.hole_radius,
        bearing_radius: pair.bearing_radius,
        contact_radius,
        half_angle: ((contact_radius - pair.bearing_radius) / pair.thinner()).atan(),
        profile: match shape {
            ConeShape::Fitted => pair.fitted_profile(),
            ConeShape::Uniform => Profile::Uniform,
            ConeShape::Linear => Profile::Power {
                radial: 1.0,
                fall: 1.0,
            },
            ConeShape::Polynomial => Profile::Quartic,
        },
        peak_per_force: 1.0,
    };
    cone.peak_per_force = cone.moment(1.0).recip();
    cone
}

impl Cone {
    /// Pressure at a radius under a clamp force, Pa; zero off the contact.
    pub fn pressure(&self, radius: f64, force: f64) -> f64 {
        force * self.peak_per_force * self.shape(radius)
    }

    /// Pressure over its value at the hole, 1.
    fn shape(&self, radius: f64) -> f64 {
        let Some(x) = self.place(radius) else {
            return 0.0;
        };
        match self.profile {
            Profile::Power { .. } => self.ln_shape(radius).exp(),
            Profile::Uniform => 1.0,
            Profile::Quartic => (1.0 - x).powi(3) * (1.0 + 3.0 * x),
        }
    }

    /// Natural logarithm of the pressure over its value at the hole; −∞ off the contact.
    ///
    /// Powers by logarithms take half the time of `powf`, and a law that is read over ln p needs
    /// no more.
    #[inline]
    pub fn ln_shape(&self, radius: f64) -> f64 {
        let Some(x) = self.place(radius) else {
            return f64::NEG_INFINITY;
        };
        match self.profile {
            Profile::Power { radial, fall } => fall * (1.0 - (radial * x.ln()).exp()).max(0.0).ln(),
            Profile::Uniform | Profile::Quartic => self.shape(radius).ln(),
        }
    }

    /// Place between hole and contact edge, 0 to 1; none off the contact.
    #[inline]
    fn place(&self, radius: f64) -> Option<f64> {
        (self.hole_radius <= radius && radius <= self.contact_radius)
            .then(|| (radius - self.hole_radius) / (self.contact_radius - self.hole_radius))
    }

    /// Share of the clamp force carried inside a radius, 0 to 1.
    pub fn carried_within(&self, radius: f64) -> f64 {
        let x = (radius - self.hole_radius) / (self.contact_radius - self.hole_radius);
        if x >= 1.0 {
            return 1.0;
        }
        self.peak_per_force * self.moment(x.max(0.0))
    }

    /// ∫ shape dA from the hole to x, m²: with w = c − a, 2π w ∫ s(x) (a + w x) dx.
    ///
    /// ```text
    /// ∫₀ˣ ξ^m (1 − ξ^α)^β dξ = B(p, β+1) I_{x^α}(p, β+1)/α,   p = (m+1)/α
    /// ```
    fn moment(&self, x: f64) -> f64 {
        let a = self.hole_radius;
        let w = self.contact_radius - a;
        let [zeroth, first] = match self.profile {
            Profile::Power { radial, fall } => [1.0, 2.0].map(|order| {
                let (p, q) = (order / radial, fall + 1.0);
                ln_beta(p, q).exp() * beta_share(x.powf(radial), p, q) / radial
            }),
            Profile::Uniform => [x, x * x / 2.0],
            // (1 − x)³ (1 + 3x) = 1 − 6x² + 8x³ − 3x⁴
            Profile::Quartic => [
                x - 2.0 * x.powi(3) + 2.0 * x.powi(4) - 0.6 * x.powi(5),
                x * x / 2.0 - 1.5 * x.powi(4) + 1.6 * x.powi(5) - 0.5 * x.powi(6),
            ],
        };
        2.0 * PI * w * (a * zeroth + w * first)
    }

    /// Radius inside which a share of the force is carried, m.
    pub fn radius_holding(&self, share: f64) -> f64 {
        let inside = |radius: f64| self.carried_within(radius) < share;
        roots::halved(inside, self.hole_radius, self.contact_radius)
    }
}

#[cfg(test)]
mod tests;
