//! What a bolt bears: combined stress at assembly, proof load, pressure under its seats.

use std::f64::consts::PI;

use crate::{catalog::Thread, joint::Seat, preload::torque::FLANK};

/// How torsion is turned into stress over the core of the bolt.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TorsionRule {
    /// Fully plastic: W = π d₀³/12, k = 1.5; VDI 2230 from the 2001 edition on.
    Plastic,
    /// Elastic: W = π d₀³/16, k = 2; VDI 2230:1986 and older tables.
    Elastic,
}

impl TorsionRule {
    /// The factor k of the combined stress, 1.
    pub const fn factor(self) -> f64 {
        match self {
            Self::Plastic => 1.5,
            Self::Elastic => 2.0,
        }
    }

    /// Moment of resistance W = π d₀³/(8 k), m³.
    fn resistance(self, diameter: f64) -> f64 {
        PI * diameter.powi(3) / (8.0 * self.factor())
    }
}

/// Load of a bolt at the end of tightening.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Load {
    /// Clamp force F, N.
    pub force: f64,
    /// Torque that twists the bolt M, running torque included, N m.
    pub torsion: f64,
}

/// Equivalent (von Mises) stress at assembly, Pa.
///
/// ```text
/// σ = √( (F/A₀)² + 3 (M/W)² ),   A₀ = π d₀²/4
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `F` | clamp force | N | `force` |
/// | `M` | torsion | N m | `torsion` |
/// | `d₀` | stress diameter | m | `stress_diameter` |
/// | `W` | π d₀³/12 plastic, π d₀³/16 elastic | m³ | [`TorsionRule`] |
///
/// Valid: during tightening; torsion springs back in part afterwards.
/// Source: VDI 2230-1:2001.
/// Checked: `fine_thread_table_of_vdi_2230_2001`, through [`assembly_preload`].
pub fn von_mises(thread: &Thread, load: Load, rule: TorsionRule) -> f64 {
    let tension = load.force / core_area(thread);
    let shear = load.torsion / rule.resistance(thread.stress_diameter);
    (tension * tension + 3.0 * shear * shear).sqrt()
}

/// The clamp force at which the equivalent stress meets a target in the presence of a running torque, N.
///
/// ```text
/// (F/A₀)² + 3 ((F g + T_run)/W)² = σ²
/// ```
///
/// `g` is the thread lever, m; `σ` the stress allowed, Pa; `A₀` the area at the stress diameter, m², and `W` its
/// resistance to torsion, m³. None when the running torque alone exceeds it.
/// Valid: tightening alone, thread fully plastic in torsion.
/// Source: VDI 2230-1, editions from 2001 on (see `law/strength-use`).
pub fn force_at_stress(thread: &Thread, twist: Twist, stress: f64) -> Option<f64> {
    let area = core_area(thread);
    let resistance = TorsionRule::Plastic.resistance(thread.stress_diameter);
    let slope = twist.lever / resistance;
    let start = twist.running / resistance;
    let square = 1.0 / (area * area) + 3.0 * slope * slope;
    let half = 3.0 * slope * start;
    let rest = stress * stress - 3.0 * start * start;
    (rest > 0.0).then(|| ((half * half + square * rest).sqrt() - half) / square)
}

/// Torsion as it grows with force.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Twist {
    /// Torsion per clamp force g, m.
    pub lever: f64,
    /// Torsion without force, N m.
    pub running: f64,
}

/// What an assembly preload may use.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Target {
    /// 0.2 % yield, Pa.
    pub yield_strength: f64,
    /// Thread friction `μ_t`, 1.
    pub thread_friction: f64,
    /// Utilisation ν of the yield strength by the equivalent stress, 1; the tables take 0.9.
    pub utilisation: f64,
}

/// Assembly preload of the VDI tables, N.
///
/// ```text
/// F = A₀ ν R_p / √( 1 + 3 [ k (d₂/d₀)(P/(π d₂) + 1.155 μ_t) ]² )
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `A₀` | π d₀²/4 | m² | `stress_diameter` |
/// | `ν` | utilisation | 1 | `utilisation` |
/// | `R_p` | yield strength | Pa | `yield_strength` |
/// | `k` | 1.5 plastic, 2 elastic | 1 | [`TorsionRule`] |
/// | `d₂`, `P` | pitch diameter, pitch | m | `pitch_diameter`, `pitch` |
/// | `μ_t` | thread friction | 1 | `thread_friction` |
///
/// Valid: no running torque, full-shank bolts whose thread is the weakest section.
/// Source: VDI 2230-1, k = 1.5 from the 2001 edition on, k = 2 in the 1986 edition and before.
/// Checked: `fine_thread_table_of_vdi_2230_2001`, `stainless_table_of_vdi_2230_2001`, `old_edition_preloads_follow_k_2`.
pub fn assembly_preload(thread: &Thread, target: &Target, rule: TorsionRule) -> f64 {
    let angle = thread.pitch / (PI * thread.pitch_diameter) + 2.0 * FLANK * target.thread_friction;
    let ratio = rule.factor() * thread.pitch_diameter / thread.stress_diameter * angle;
    core_area(thread) * target.utilisation * target.yield_strength
        / (1.0 + 3.0 * ratio * ratio).sqrt()
}

/// Proof load, N.
///
/// ```text
/// F_p = A_s S_p
/// ```
///
/// `A_s` is the stress area of the thread, m², `S_p` the proof stress, Pa. Valid: tension without torsion.
/// Source: ISO 898-1:2013. Checked: `proof_loads_of_iso_898`.
pub fn proof_load(thread: &Thread, proof_stress: f64) -> f64 {
    thread.stress_area * proof_stress
}

/// Mean pressure under a head, nut or washer, Pa.
///
/// ```text
/// p = F / (π (r_o² − r_i²))
/// ```
///
/// `r_o` and `r_i` are the outer and inner radius of the annulus, m. Valid: the mean; the edge bears more.
/// Source: VDI 2230-1, F over the bearing annulus.
/// Checked: `head_pressure_of_an_m6_passes_the_limit_of_aw_6082`.
pub fn seat_pressure(seat: &Seat, force: f64) -> f64 {
    force / (PI * (seat.outer_radius.powi(2) - seat.inner_radius.powi(2)))
}

/// Area of the stress diameter A₀ = π d₀²/4, m²; the tables of stress areas differ from it by rounding.
fn core_area(thread: &Thread) -> f64 {
    PI / 4.0 * thread.stress_diameter.powi(2)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::preload::fixture::metric;

    #[test]
    fn assembly_preloads_of_m10_fine_are_those_of_vdi_2230_2001() {
        // Fine-thread table of VDI 2230-1:2001, seen in a catalogue reprint: M10×1.25, kN, for 8.8, 10.9 and 12.9.
        // Printed to 0.1 kN, some cut instead of rounded: one unit.
        let thread = metric(10e-3, 1.25e-3);
        for (friction, printed) in [
            (0.10, [32.4, 47.5, 55.6]),
            (0.12, [31.6, 46.4, 54.3]),
            (0.14, [30.8, 45.2, 52.9]),
        ] {
            for (yield_strength, printed) in [640e6, 940e6, 1100e6].into_iter().zip(printed) {
                let target = Target {
                    yield_strength,
                    thread_friction: friction,
                    utilisation: 0.9,
                };
                let found = assembly_preload(&thread, &target, TorsionRule::Plastic) * 1e-3;
                assert!(
                    (found - printed).abs() < 0.1,
                    "{friction}: {found} {printed}"
                );
            }
        }
    }

    #[test]
    fn a_sheet_with_elastic_torsion_gives_less_preload() {
        // A maker's worked sheet, seen: M16 8.8, friction 0.11 in the thread, 90 % of yield, 76 892 N. Diameters
        // printed to 0.01 mm: 0.1 %.
        let thread = metric(16e-3, 2e-3);
        let target = Target {
            yield_strength: 640e6,
            thread_friction: 0.11,
            utilisation: 0.9,
        };
        let elastic = assembly_preload(&thread, &target, TorsionRule::Elastic);
        assert!((elastic / 76_892.0 - 1.0).abs() < 1e-3, "{elastic}");
        let plastic = assembly_preload(&thread, &target, TorsionRule::Plastic);
        assert!(elastic < plastic);
    }

    #[test]
    fn assembly_preload_stresses_the_bolt_to_its_utilisation() {
        let thread = metric(6e-3, 1e-3);
        for friction in [0.0, 0.08, 0.12, 0.3] {
            let target = Target {
                yield_strength: 640e6,
                thread_friction: friction,
                utilisation: 0.8,
            };
            let lever = thread.pitch / (2.0 * PI) + FLANK * friction * thread.pitch_diameter;
            for rule in [TorsionRule::Plastic, TorsionRule::Elastic] {
                let force = assembly_preload(&thread, &target, rule);
                let torsion = force * lever;
                let stress = von_mises(&thread, Load { force, torsion }, rule);
                // One formula solved for the force, the other for the stress: rounding alone.
                assert!((stress / (0.8 * 640e6) - 1.0).abs() < 1e-12, "{stress}");
            }
            let twist = Twist {
                lever,
                running: 0.0,
            };
            let found = force_at_stress(&thread, twist, 0.8 * 640e6).expect("no running torque");
            let preload = assembly_preload(&thread, &target, TorsionRule::Plastic);
            assert!((found / preload - 1.0).abs() < 1e-12);
        }
    }
}
