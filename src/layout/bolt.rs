//! One bolt of the screening model: what it conducts between two sheets, and what it weighs.

use std::f64::consts::PI;

use crate::{
    catalog,
    joint::{Engagement, Fastener, Joint},
    pressure::Cone,
};

/// Rings between hole and kernel.
const RINGS: usize = 400;

/// Density of a bolt whose material is not in the catalogue, kg/m³: steel.
const STEEL: f64 = 7900.0;

/// Two plates about one bolt, as sheets.
#[derive(Clone, Copy, Debug)]
pub(super) struct Around<'a> {
    /// Pressure of the bolt.
    pub cone: &'a Cone,
    /// Its force, N.
    pub force: f64,
    /// Conductivity times thickness of both sheets, W/K.
    pub sheet: [f64; 2],
    /// Transverse resistance of both half plates, m² K/W.
    pub transverse: f64,
    /// Conductance of the shank, W/K.
    pub shank: f64,
}

/// What a bolt conducts beyond the open gap.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Link {
    /// From sheet to sheet at the radius of the kernel, K/W.
    pub resistance: f64,
    /// Conductance of the face alone, W/K.
    pub contact: f64,
}

impl Around<'_> {
    /// The bolt within a radius, m, the open gap left out.
    ///
    /// ```text
    /// (1/r) d/dr (r S dθ/dr) = g θ,   1/S = 1/(k₁ t₁) + 1/(k₂ t₂),   R = θ(ρ)/Q(ρ)
    /// g = 1/(1/h(p) + τ) − 1/(1/h(0) + τ),   τ = t₁/3k₁ + t₂/3k₂
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `θ` | difference of the sheets | K | |
    /// | `S` | sheets in series | W/K | `sheet` |
    /// | `g` | what the pressed face adds to the open one | W/(m² K) | |
    /// | `τ` | way through both half plates | m² K/W | `transverse` |
    ///
    /// No heat enters within ρ, so one difference carries both sheets. The shank is spread over the
    /// head. Source: conduction in two thin sheets, textbook form.
    /// Checked: `a_bolt_of_even_pressure_is_a_bessel_fin`.
    pub(super) fn within(&self, radius: f64, conductance: impl Fn(f64) -> f64) -> Link {
        let series = (self.sheet[0].recip() + self.sheet[1].recip()).recip();
        let through = |h: f64| (h.recip() + self.transverse).recip();
        let open = conductance(0.0);
        let (from, head) = (self.cone.hole_radius, self.cone.bearing_radius.min(radius));
        let head_area = PI * (head * head - from * from);
        let step = (radius - from) / RINGS as f64;
        let (mut theta, mut heat, mut contact) = (1.0, 0.0, 0.0);
        for ring in 0..RINGS {
            let middle = from + (ring as f64 + 0.5) * step;
            let area = 2.0 * PI * middle * step;
            let local = conductance(self.cone.pressure(middle, self.force));
            let shank = if middle < head {
                self.shank / head_area
            } else {
                0.0
            };
            contact += area * (local - open);
            // Half a ring of sheet, the face, half a ring of sheet.
            let sheet = 0.5 * step / (2.0 * PI * middle * series);
            theta += heat * sheet;
            heat += area * (through(local) - through(open) + shank) * theta;
            theta += heat * sheet;
        }
        Link {
            resistance: theta / heat,
            contact,
        }
    }
}

/// Mass of one fastener with head, nut and washers, kg.
///
/// ```text
/// m = ρ (A_s l + head + nut + washers)
/// socket head: cylinder 1.5 d wide, d high; other heads: hexagon 1.5 d across flats, 0.65 d high
/// nut: hexagon 1.5 d across flats less its bore, 0.8 d high
/// ```
///
/// Proportions of ISO 4762, 4014 and 4032 from memory; inserts and holes are left out.
pub(super) fn mass(joint: &Joint, fastener: &Fastener) -> f64 {
    let material = catalog::material(&fastener.grade.like);
    let density = material.and_then(|material| material.density.as_ref());
    let density = density.map_or(STEEL, |density| density.value);
    let d = fastener.thread.diameter;
    let hexagon = 0.5 * 3.0_f64.sqrt() * (1.5 * d).powi(2);
    let plates: f64 = joint.plates.iter().map(|plate| plate.thickness).sum();
    let far = joint.plates[joint.far_plate(fastener)].thickness;
    let (length, nut) = match fastener.engagement {
        Engagement::Nut => (plates + 0.8 * d, 0.8 * d * (hexagon - 0.25 * PI * d * d)),
        Engagement::Tapped { length } | Engagement::Insert { length } => {
            (plates - far + length, 0.0)
        }
    };
    let head = if fastener.cylindrical_head {
        0.25 * PI * (1.5 * d).powi(2) * d
    } else {
        0.65 * d * hexagon
    };
    let shank = fastener.thread.stress_area * (length + fastener.washer_thickness);
    let washers = fastener.washer_thickness * fastener.head_seat.area();
    density * (shank + head + nut + washers)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::pressure::Profile;

    #[test]
    fn a_bolt_of_even_pressure_is_a_bessel_fin() {
        // A tiny hole, one pressure to the edge: R = I0(m ρ)/(2π ρ S m I1(m ρ)).
        let cone = Cone {
            hole_radius: 1e-9,
            bearing_radius: 0.01,
            contact_radius: 0.01,
            half_angle: 0.0,
            profile: Profile::Uniform,
            peak_per_force: 1.0 / (PI * 1e-4),
        };
        let around = Around {
            cone: &cone,
            force: 1e3,
            sheet: [1.0, 1.0],
            transverse: 1e-4,
            shank: 0.0,
        };
        let found = around.within(0.01, |pressure| if pressure > 0.0 { 1e4 } else { 1e-9 });
        // g = 1/(1e-4 + 1e-4) = 5000, S = 0.5, m = 100, m ρ = 1: I0(1) = 1.2660659, I1(1) = 0.5651591
        // (tables of Abramowitz and Stegun, from memory).
        let exact = 1.266_065_9 / (2.0 * PI * 0.01 * 0.5 * 100.0 * 0.565_159_1);
        // Second order in 400 rings.
        assert!(
            (found.resistance / exact - 1.0).abs() < 1e-4,
            "{found:?} {exact}"
        );
        assert!((found.contact / (1e4 * PI * 1e-4) - 1.0).abs() < 1e-3);
    }
}
