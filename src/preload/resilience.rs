//! How far bolt and plates give under the clamp force: compliances in m/N, stiffnesses in N/m.

use std::f64::consts::PI;

use crate::catalog::Thread;

/// Form of the bolt head, which adds a length to the bolt.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HeadForm {
    /// Hexagon: half a diameter.
    Hexagon,
    /// Socket cap: 0.4 diameters.
    Socket,
}

/// What holds the far end of the bolt.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum FarEnd {
    /// A nut of the bolt's own material.
    Nut,
    /// A thread in a part of this Young's modulus, Pa.
    Tapped {
        /// Young's modulus of the tapped part, Pa.
        youngs_modulus: f64,
    },
}

/// A bolt between its head and its engaged thread.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BoltShape<'a> {
    /// Thread.
    pub thread: &'a Thread,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Plain shank within the grip, m.
    pub shank: f64,
    /// Free thread within the grip, m.
    pub free_thread: f64,
    /// Head.
    pub head: HeadForm,
    /// Far end.
    pub far: FarEnd,
}

/// Compliance of a bolt, part by part, m/N.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BoltCompliance {
    /// Head.
    pub head: f64,
    /// Plain shank.
    pub shank: f64,
    /// Free thread.
    pub free_thread: f64,
    /// Core of the engaged thread.
    pub engaged: f64,
    /// Nut or tapped part.
    pub far: f64,
}

impl BoltCompliance {
    /// Sum of the parts `δ_S`, m/N.
    pub fn total(&self) -> f64 {
        self.head + self.shank + self.free_thread + self.engaged + self.far
    }
}

/// Compliance of a bolt by the substitute lengths of VDI 2230, m/N.
///
/// ```text
/// δ_S = l_head/(E A_N) + l_shank/(E A_N) + l_thread/(E A₃) + 0.5 d/(E A₃) + far
/// far = 0.4 d/(E A_N) for a nut, 0.33 d/(E_M A_N) tapped;   l_head = 0.5 d hexagon, 0.4 d socket
/// A_N = π d²/4,  A₃ = π d₃²/4
/// ```
///
/// `l` are lengths, m; `d` is the nominal and `d₃` the root diameter, m; `E` and `E_M` are the moduli of bolt and of
/// the part that holds the thread, Pa. Valid: bolts of one material, elastic.
/// Source: VDI 2230-1, substitute lengths from memory.
/// Checked: `example_a_of_the_resilience_chain`, `example_b_of_the_resilience_chain`.
pub fn bolt_compliance(bolt: &BoltShape<'_>) -> BoltCompliance {
    let diameter = bolt.thread.diameter;
    let nominal = PI / 4.0 * diameter.powi(2);
    let core = PI / 4.0 * bolt.thread.minor_diameter.powi(2);
    let modulus = bolt.youngs_modulus;
    let head = match bolt.head {
        HeadForm::Hexagon => 0.5,
        HeadForm::Socket => 0.4,
    };
    BoltCompliance {
        head: head * diameter / (modulus * nominal),
        shank: bolt.shank / (modulus * nominal),
        free_thread: bolt.free_thread / (modulus * core),
        engaged: 0.5 * diameter / (modulus * core),
        far: match bolt.far {
            FarEnd::Nut => 0.4 * diameter / (modulus * nominal),
            FarEnd::Tapped { youngs_modulus } => 0.33 * diameter / (youngs_modulus * nominal),
        },
    }
}

/// Whether the cone opens from both ends or from the head alone.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ConeKind {
    /// Through bolt with nut: two cones meet in the middle, w = 1.
    Through,
    /// Tapped: one cone to the end of the grip, w = 2.
    Tapped,
}

impl ConeKind {
    fn weight(self) -> f64 {
        match self {
            Self::Through => 1.0,
            Self::Tapped => 2.0,
        }
    }
}

/// The clamped parts as the substitute cone sees them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Clamped {
    /// Outer diameter of the seat `d_w`, m.
    pub seat_diameter: f64,
    /// Hole diameter `d_h`, m.
    pub hole_diameter: f64,
    /// Grip `l_K`, m.
    pub grip: f64,
    /// Outer diameter of the parts `D_A`, m; not below the seat.
    pub outer_diameter: f64,
    /// Kind of joint.
    pub kind: ConeKind,
}

impl Clamped {
    /// tan φ of the substitute cone, 1.
    ///
    /// ```text
    /// through: 0.362 + 0.032 ln(β/2) + 0.153 ln y
    /// tapped:  0.348 + 0.013 ln β + 0.193 ln y,    β = l_K/d_w, y = D_A/d_w
    /// ```
    ///
    /// `l_K` is the grip, `d_w` the outer diameter of the seat, `D_A` that of the clamped body, m.
    /// Valid: one bolt on its axis, `D_A` above `d_w`.
    /// Source: VDI 2230-1, coefficients from memory.
    pub fn cone_tangent(&self) -> f64 {
        let slender = self.grip / self.seat_diameter;
        let wide = (self.outer_diameter / self.seat_diameter).ln();
        match self.kind {
            ConeKind::Through => 0.362 + 0.032 * (slender / 2.0).ln() + 0.153 * wide,
            ConeKind::Tapped => 0.348 + 0.013 * slender.ln() + 0.193 * wide,
        }
    }

    /// Axial length over which each cone opens before it meets the outer diameter or the other cone, m.
    fn cone_length(&self, tangent: f64) -> f64 {
        let end = self.grip * self.kind.weight() / 2.0;
        end.min((self.outer_diameter - self.seat_diameter) / (2.0 * tangent))
    }

    /// Diameter of the cone at a depth below the head, m.
    fn diameter_at(&self, depth: f64, tangent: f64) -> f64 {
        let from_seat = match self.kind {
            ConeKind::Through => depth.min(self.grip - depth),
            ConeKind::Tapped => depth,
        };
        (self.seat_diameter + 2.0 * tangent * from_seat).min(self.outer_diameter)
    }

    /// Compliance of parts of one material times its Young's modulus, `E δ_P`, 1/m.
    ///
    /// ```text
    /// cone:            2/(w d_h tan φ) ln[(d_w+d_h)(D−d_h) / ((d_w−d_h)(D+d_h))] / π,   D = min(D_A, d_w + w l_K tan φ)
    /// then the sleeve: 4/(D_A² − d_h²) [ l_K − (D_A − d_w)/(w tan φ) ] / π,   where D_A < d_w + w l_K tan φ
    /// ```
    ///
    /// The tangent is an argument so that other rules can use the same body. Divide by E for `δ_P`.
    ///
    /// Valid: `d_h < d_w ≤ D_A`. Source: VDI 2230-1, from memory.
    /// Checked: `cone_closed_form_equals_the_integral`, `cone_of_30_degrees_is_two_frusta`, examples A, A′, B.
    pub fn stretch(&self, tangent: f64) -> f64 {
        let (seat, hole) = (self.seat_diameter, self.hole_diameter);
        let weight = self.kind.weight();
        let limit = seat + weight * self.grip * tangent;
        let end = limit.min(self.outer_diameter);
        let cone = 2.0 / (weight * hole * tangent)
            * ((seat + hole) * (end - hole) / ((seat - hole) * (end + hole))).ln();
        let sleeve = if self.outer_diameter < limit {
            4.0 / (self.outer_diameter.powi(2) - hole.powi(2))
                * (self.grip - (self.outer_diameter - seat) / (weight * tangent))
        } else {
            0.0
        };
        (cone + sleeve) / PI
    }
}

/// One layer of a clamped stack.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StackLayer {
    /// Thickness, m.
    pub thickness: f64,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Hole diameter, m.
    pub hole_diameter: f64,
}

/// Compliance of a stack of layers inside the substitute cone, head side first, m/N.
///
/// ```text
/// δ_P = Σ ∫ dz / (E_i A(z))     A(z): area of the cone at depth z, less the hole
/// ```
///
/// Each layer is cut where the cone changes its form and every piece is a frustum or a sleeve in closed form.
/// With equal layers this is [`Clamped::stretch`] over E.
///
/// Valid: layers as wide as the cone; one angle for all, whatever their moduli.
/// Source: VDI 2230-1, cone cut into layers. Checked: `equal_layers_are_one_body`.
pub fn stack_compliance(clamped: &Clamped, layers: &[StackLayer]) -> f64 {
    let tangent = clamped.cone_tangent();
    let cone = clamped.cone_length(tangent);
    let cuts = match clamped.kind {
        ConeKind::Through => [cone, clamped.grip - cone],
        ConeKind::Tapped => [cone, cone],
    };
    let mut top = 0.0;
    let mut sum = 0.0;
    for layer in layers {
        let bottom = top + layer.thickness;
        let inside = cuts
            .iter()
            .copied()
            .filter(|cut| top < *cut && *cut < bottom);
        let mut from = top;
        for to in inside.chain([bottom]) {
            sum += frustum_stretch(
                [
                    clamped.diameter_at(from, tangent),
                    clamped.diameter_at(to, tangent),
                ],
                layer.hole_diameter,
                to - from,
            ) / layer.youngs_modulus;
            from = to;
        }
        top = bottom;
    }
    sum
}

/// ∫ dz/A over a hollow frustum, 1/m: `4/π ∫ dz/(D² − d_h²)` with D linear in z.
fn frustum_stretch(diameters: [f64; 2], hole: f64, length: f64) -> f64 {
    let [first, last] = diameters;
    let rise = (last - first).abs();
    if rise < 1e-9 * first {
        return 4.0 * length / (PI * (first * first - hole * hole));
    }
    let (small, large) = (first.min(last), first.max(last));
    let log = ((small + hole) * (large - hole) / ((small - hole) * (large + hole))).ln();
    2.0 * length / (PI * hole * rise) * log
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::preload::fixture::metric;

    /// Seat, hole, grip and outer diameter in mm.
    fn body(kind: ConeKind, sizes: [f64; 4]) -> Clamped {
        let [seat_diameter, hole_diameter, grip, outer_diameter] = sizes.map(|size| size * 1e-3);
        Clamped {
            seat_diameter,
            hole_diameter,
            grip,
            outer_diameter,
            kind,
        }
    }

    fn bodies() -> [Clamped; 5] {
        [
            body(ConeKind::Through, [14.63, 11.0, 40.0, 40.0]),
            body(ConeKind::Through, [14.63, 11.0, 40.0, 25.0]),
            body(ConeKind::Through, [8.88, 6.6, 20.0, 9.0]),
            body(ConeKind::Tapped, [9.38, 6.6, 12.0, 30.0]),
            body(ConeKind::Tapped, [9.38, 6.6, 30.0, 14.0]),
        ]
    }

    #[test]
    fn a_tapped_part_gives_as_a_third_of_a_diameter_of_itself() {
        let thread = metric(6e-3, 1e-3);
        let shape = |far: FarEnd| BoltShape {
            thread: &thread,
            youngs_modulus: 205e9,
            shank: 0.0,
            free_thread: 12e-3,
            head: HeadForm::Socket,
            far,
        };
        let tapped = bolt_compliance(&shape(FarEnd::Tapped {
            youngs_modulus: 70e9,
        }));
        // A cylinder of d 6 mm and 0.33 d length of the tapped aluminium: 1.98 mm/(70 GPa · 28.2743 mm²).
        assert!(
            (tapped.far / 1.000_40e-9 - 1.0).abs() < 1e-5,
            "{}",
            tapped.far
        );
        // M6 socket in aluminium, computed for this project by an independent program, five digits.
        assert!(
            (tapped.total() / 5.5037e-9 - 1.0).abs() < 1e-4,
            "{}",
            tapped.total()
        );
        // A nut of 0.4 d of the bolt's own steel.
        let nut = bolt_compliance(&shape(FarEnd::Nut));
        assert!((nut.far / 4.140_62e-10 - 1.0).abs() < 1e-5, "{}", nut.far);
        assert!((nut.total() - nut.far - (tapped.total() - tapped.far)).abs() < 1e-20);
    }

    #[test]
    fn cone_tangents_start_from_their_constants() {
        // Where both logarithms are nothing the constants of VDI 2230, from memory, stand alone; rounding.
        let through = body(ConeKind::Through, [10.0, 6.0, 20.0, 10.0]).cone_tangent();
        assert!((through - 0.362).abs() < 1e-12, "{through}");
        let tapped = body(ConeKind::Tapped, [10.0, 6.0, 10.0, 10.0]).cone_tangent();
        assert!((tapped - 0.348).abs() < 1e-12, "{tapped}");
        // Computed for this project by an independent program, four digits.
        for (body, printed) in [(0, 0.5259), (1, 0.4540), (3, 0.5756)] {
            let found = bodies()[body].cone_tangent();
            assert!((found - printed).abs() < 6e-5, "{found} {printed}");
        }
    }

    #[test]
    fn closed_form_of_the_cone_is_the_sum_of_its_slices() {
        for body in bodies() {
            for tangent in [body.cone_tangent(), 0.3, 0.6] {
                let steps = 20_000;
                let dz = body.grip / f64::from(steps);
                let sum: f64 = (0..steps)
                    .map(|step| (f64::from(step) + 0.5) * dz)
                    .map(|z| {
                        let depth = match body.kind {
                            ConeKind::Through => z.min(body.grip - z),
                            ConeKind::Tapped => z,
                        };
                        let diameter =
                            (body.seat_diameter + 2.0 * tangent * depth).min(body.outer_diameter);
                        4.0 * dz / (PI * (diameter.powi(2) - body.hole_diameter.powi(2)))
                    })
                    .sum();
                // The midpoint rule on 20 000 steps with kinks: below 1e-6.
                let found = body.stretch(tangent);
                assert!(
                    (found / sum - 1.0).abs() < 1e-6,
                    "{body:?} {tangent}: {found} {sum}"
                );
            }
        }
    }

    #[test]
    fn layers_of_one_material_are_one_body() {
        for body in bodies() {
            let layers = [0.1, 0.25, 0.35, 0.3].map(|share| StackLayer {
                thickness: share * body.grip,
                youngs_modulus: 70e9,
                hole_diameter: body.hole_diameter,
            });
            let one = body.stretch(body.cone_tangent()) / 70e9;
            // The same integral cut elsewhere: rounding alone.
            assert!((stack_compliance(&body, &layers) / one - 1.0).abs() < 1e-9);
        }
    }

    #[test]
    fn a_film_gives_as_a_disc_of_its_mean_diameter() {
        for body in bodies() {
            for thickness in [5e-9, 20e-9, 40e-9, 1e-6] {
                let film = StackLayer {
                    thickness,
                    youngs_modulus: 70e9,
                    hole_diameter: body.hole_diameter,
                };
                let mean = body.seat_diameter + body.cone_tangent() * thickness;
                let area = PI / 4.0 * (mean.powi(2) - body.hole_diameter.powi(2));
                let found = stack_compliance(&body, &[film]) * 70e9 * area / thickness;
                // The cone opens by 1e-4 of its diameter at most, squared; the logarithm of a number near one
                // keeps nine digits of the thinnest film.
                assert!((found - 1.0).abs() < 1e-7, "{thickness}: {found}");
            }
        }
    }
}
