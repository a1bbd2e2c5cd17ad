//! Threads in shear: areas, the length a thread must engage, and the rule of thumb.

use std::f64::consts::PI;

use crate::{
    catalog::Thread,
    joint::{Engagement, Fastener},
    preload::torque::FLANK,
};

/// Shear strength over tensile strength of bolt steels, 1: the lower of the 0.5 to 0.6 in use.
///
/// Source: Industrial Fasteners Institute bulletin as quoted (0.5).
pub const SHEAR_OVER_TENSILE: f64 = 0.5;

/// Shear yield over tensile yield by von Mises, 1/√3.
const SHEAR_YIELD: f64 = 0.577_350_269_189_625_8;

const INCH: f64 = 0.0254;

/// Shear strength at rupture of a plate of which only the yield strength is known, Pa.
///
/// ```text
/// τ = 0.577 R_p;   soft steel (R_p < 400 MPa) 0.85 R_p;   soft austenitic steel (R_p < 300 MPa) R_p
/// ```
///
/// A thread strips at rupture, and soft steels harden far beyond yield; 0.577 is von Mises at yield.
/// Valid: steels below 4e8 Pa, austenitic ones below 3e8 Pa; every other metal at 0.577.
/// Source: judgement. The factor of soft steel is set on the maker's trials of engaged length, 1.0 d for class 8.8
/// in S235; that of austenitic steel is two thirds of `0.6 R_m`.
/// Checked: `class_8_8_in_s235_needs_about_one_diameter`.
pub fn plate_shear_strength(family: &str, yield_strength: f64) -> f64 {
    let factor = match family {
        "steel" if yield_strength < 400e6 => 0.85,
        "stainless" if yield_strength < 300e6 => 1.0,
        _ => SHEAR_YIELD,
    };
    factor * yield_strength
}

/// Limits of size that bound the shear areas of a thread pair.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ThreadLimits {
    /// Pitch, m.
    pub pitch: f64,
    /// Largest minor diameter of the nut `K_n`, m.
    pub nut_minor_most: f64,
    /// Largest pitch diameter of the nut `E_n`, m.
    pub nut_pitch_most: f64,
    /// Smallest pitch diameter of the bolt `E_s`, m.
    pub bolt_pitch_least: f64,
    /// Smallest major diameter of the bolt `D_s`, m.
    pub bolt_major_least: f64,
}

impl ThreadLimits {
    /// Limits of the usual fit: 6g/6H metric, 2A/2B inch, from the tolerance formulas.
    ///
    /// Metric, µm with P and d in mm: es = 15 + 11 P; `T_d = 180 P^(2/3) − 3.15/√P`;
    /// `T_d2 = 90 P^0.4 d^0.1`; `T_D2 = 1.32 T_d2`; `T_D1 = 230 P^0.7`, below 1 mm 433 P − 190 P^1.22.
    /// Inch, with P, D in inches: T = 0.0015 (D^(1/3) + √D) + 0.015 P^(2/3), allowance 0.3 T, major 0.06 P^(2/3),
    /// nut pitch 1.3 T, nut minor P/4 − 0.4 P², below 1/4 in 0.05 P^(2/3) + 0.03 P/D − 0.002.
    ///
    /// Valid: engaged length about one diameter. Source: ISO 965-1 and ASME B1.1 tolerance formulas, from memory.
    /// Checked: `inch_limits_follow_the_tolerance_formulas`, `metric_limits_of_m10`.
    pub fn of(thread: &Thread) -> Self {
        let sizes = if thread.inch {
            inch_tolerances(thread)
        } else {
            metric_tolerances(thread)
        };
        Self {
            pitch: thread.pitch,
            nut_minor_most: thread.nut_minor_diameter + sizes.nut_minor,
            nut_pitch_most: thread.pitch_diameter + sizes.nut_pitch,
            bolt_pitch_least: thread.pitch_diameter - sizes.allowance - sizes.bolt_pitch,
            bolt_major_least: thread.diameter - sizes.allowance - sizes.bolt_major,
        }
    }

    /// Shear areas per engaged length, m.
    ///
    /// ```text
    /// bolt: A_s/L = π K_n n [ 1/(2n) + (E_s − K_n)/√3 ]
    /// nut:  A_n/L = π D_s n [ 1/(2n) + (D_s − E_n)/√3 ]
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `n` | threads per length, 1/P | 1/m | `pitch` |
    /// | `K_n` | largest minor diameter of the nut | m | `nut_minor_most` |
    /// | `E_n` | largest pitch diameter of the nut | m | `nut_pitch_most` |
    /// | `E_s` | smallest pitch diameter of the bolt | m | `bolt_pitch_least` |
    /// | `D_s` | smallest major diameter of the bolt | m | `bolt_major_least` |
    ///
    /// Valid: 60° threads at the limits of their tolerance, load shared evenly along the engagement.
    /// Source: the form of FED-STD-H28.
    /// Checked: `thread_shear_areas_of_fed_std_h28`.
    pub fn shear_widths(&self) -> ShearWidths {
        // tan 30° = 1/√3: how fast a flank gains width.
        let (pitch, flank) = (self.pitch, FLANK);
        ShearWidths {
            bolt: PI
                * self.nut_minor_most
                * (0.5 + flank * (self.bolt_pitch_least - self.nut_minor_most) / pitch),
            nut: PI
                * self.bolt_major_least
                * (0.5 + flank * (self.bolt_major_least - self.nut_pitch_most) / pitch),
        }
    }
}

/// Shear area per engaged length of either partner, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ShearWidths {
    /// Of the bolt's thread.
    pub bolt: f64,
    /// Of the nut's, or the tapped plate's, thread.
    pub nut: f64,
}

struct Tolerances {
    allowance: f64,
    bolt_major: f64,
    bolt_pitch: f64,
    nut_pitch: f64,
    nut_minor: f64,
}

fn metric_tolerances(thread: &Thread) -> Tolerances {
    let (pitch, diameter) = (thread.pitch * 1e3, thread.diameter * 1e3);
    let bolt_pitch = 90.0 * pitch.powf(0.4) * diameter.powf(0.1);
    let nut_minor = if pitch < 1.0 {
        433.0 * pitch - 190.0 * pitch.powf(1.22)
    } else {
        230.0 * pitch.powf(0.7)
    };
    Tolerances {
        allowance: (15.0 + 11.0 * pitch) * 1e-6,
        bolt_major: (180.0 * pitch.powf(2.0 / 3.0) - 3.15 / pitch.sqrt()) * 1e-6,
        bolt_pitch: bolt_pitch * 1e-6,
        nut_pitch: 1.32 * bolt_pitch * 1e-6,
        nut_minor: nut_minor * 1e-6,
    }
}

fn inch_tolerances(thread: &Thread) -> Tolerances {
    let (pitch, diameter) = (thread.pitch / INCH, thread.diameter / INCH);
    let fine = pitch.powf(2.0 / 3.0);
    let bolt_pitch = 0.0015 * (diameter.cbrt() + diameter.sqrt()) + 0.015 * fine;
    let nut_minor = if diameter < 0.25 {
        0.05 * fine + 0.03 * pitch / diameter - 0.002
    } else {
        0.25 * pitch - 0.4 * pitch * pitch
    };
    Tolerances {
        allowance: 0.3 * bolt_pitch * INCH,
        bolt_major: 0.06 * fine * INCH,
        bolt_pitch: bolt_pitch * INCH,
        nut_pitch: 1.3 * bolt_pitch * INCH,
        nut_minor: nut_minor * INCH,
    }
}

/// Strengths of a thread pair in shear.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PairStrength {
    /// Tensile strength of the bolt, Pa.
    pub bolt_tensile: f64,
    /// Shear strength of the plate, Pa.
    pub plate_shear: f64,
}

/// Engaged length at which the bolt breaks before either thread strips, m.
///
/// ```text
/// L = A_s R_m / min( A_bolt/L · 0.5 R_m, A_nut/L · τ_plate )
/// ```
///
/// Valid: full threads over the length, countersink and chamfer apart.
/// Source: the form of FED-STD-H28.
/// Checked: `required_engagement_balances_strip_and_break`.
pub fn required_engagement(thread: &Thread, strength: PairStrength) -> f64 {
    thread.stress_area * strength.bolt_tensile / strip_width(thread, strength)
}

/// Force at which the weaker of the two threads strips, per engaged length, N/m.
pub fn strip_width(thread: &Thread, strength: PairStrength) -> f64 {
    let widths = ThreadLimits::of(thread).shear_widths();
    (widths.bolt * SHEAR_OVER_TENSILE * strength.bolt_tensile)
        .min(widths.nut * strength.plate_shear)
}

/// Shear area of the plate's thread around an insert, per engaged length, m.
///
/// ```text
/// A/L = 0.5 π D
/// ```
///
/// Half of the cylinder over the insert's outer thread; a full 60° profile without play keeps 0.87 of it
/// (½ + 0.6495/√3), tolerances and thread ends take the rest.
/// Valid: inserts that hold in the plate by an outer thread.
/// Source: common practice, no source. Checked: `insert_of_a_larger_thread_holds_more`.
pub fn parent_width(outer_diameter: f64) -> f64 {
    0.5 * PI * outer_diameter
}

/// Engaged length by the rule of thumb, in diameters: steel 1, iron and copper alloys 1.5, light alloys 2.
///
/// Families are those of the catalogue; an unknown one is taken as a light alloy.
/// Valid: a first look; the strength of both threads decides.
/// Source: Industrial Fasteners Institute bulletin as quoted; copper as brass, titanium as iron are judgement.
pub fn rule_of_thumb(family: &str) -> f64 {
    match family {
        "steel" | "stainless" | "nickel" => 1.0,
        "iron" | "cast iron" | "brass" | "bronze" | "copper" | "titanium" => 1.5,
        _ => 2.0,
    }
}

/// The engaged length of a fastener and what it ought to be.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EngagementCheck {
    /// Engaged length, m.
    pub length: f64,
    /// Length by the rule of thumb, m.
    pub rule: f64,
    /// Length at which the bolt breaks first, m, where the plate's shear strength is known.
    pub required: Option<f64>,
}

impl EngagementCheck {
    /// Whether either measure finds the length too short.
    pub fn is_short(&self) -> bool {
        self.length < self.rule || self.required.is_some_and(|required| self.length < required)
    }
}

/// What a thread is cut into.
#[derive(Clone, Debug, PartialEq)]
pub struct ThreadedPart {
    /// Family of the material, as the catalogue calls it.
    pub family: String,
    /// Shear strength, Pa, where known.
    pub shear_strength: Option<f64>,
}

/// Engaged length against its two measures; none for a nut, which its standard matches to the bolt.
///
/// A threaded insert is steel inside, so its rule is one diameter; its outer thread is wider than the bolt's,
/// so the shear length of the plate, taken at the bolt's thread, is on the safe side.
pub fn engagement_check(fastener: &Fastener, part: &ThreadedPart) -> Option<EngagementCheck> {
    let (length, diameters) = match fastener.engagement {
        Engagement::Nut => return None,
        Engagement::Tapped { length } => (length, rule_of_thumb(&part.family)),
        Engagement::Insert { length } => (length, 1.0),
    };
    Some(EngagementCheck {
        length,
        rule: diameters * fastener.thread.diameter,
        required: part.shear_strength.map(|plate_shear| {
            required_engagement(
                &fastener.thread,
                PairStrength {
                    bolt_tensile: fastener.grade.tensile.value,
                    plate_shear,
                },
            )
        }),
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::preload::fixture::{m6, metric};

    #[test]
    fn metric_limits_of_m10() {
        let limits = ThreadLimits::of(&metric(10e-3, 1.5e-3));
        // ISO 965 limits of M10-6g/6H, from memory, rounded there to preferred numbers: 20 µm.
        for (found, expected) in [
            (limits.nut_minor_most, 8.676e-3),
            (limits.nut_pitch_most, 9.206e-3),
            (limits.bolt_pitch_least, 8.862e-3),
            (limits.bolt_major_least, 9.732e-3),
        ] {
            assert!((found - expected).abs() < 20e-6, "{found} {expected}");
        }
    }

    #[test]
    fn required_engagement_balances_strip_and_break() {
        let thread = metric(6e-3, 1e-3);
        let strength = PairStrength {
            bolt_tensile: 700e6,
            plate_shear: 160e6,
        };
        let length = required_engagement(&thread, strength);
        let strips = length * strip_width(&thread, strength);
        // The definition: rounding alone.
        assert!((strips / (thread.stress_area * 700e6) - 1.0).abs() < 1e-12);
        // An A2-70 screw in aluminium asks about the 2 d of the rule of thumb, not 4 d nor 0.5 d.
        assert!((0.8..2.2).contains(&(length / thread.diameter)), "{length}");
        // A plate harder than the bolt leaves the bolt's own thread to strip.
        let hard = required_engagement(
            &thread,
            PairStrength {
                plate_shear: 5e9,
                ..strength
            },
        );
        let own = thread.stress_area / (0.5 * ThreadLimits::of(&thread).shear_widths().bolt);
        assert!((hard / own - 1.0).abs() < 1e-12, "{hard} {own}");
    }

    #[test]
    fn class_8_8_in_s235_needs_about_one_diameter() {
        let thread = metric(10e-3, 1.5e-3);
        let strength = PairStrength {
            bolt_tensile: 800e6,
            plate_shear: plate_shear_strength("steel", 235e6),
        };
        // Trials of a screw maker, M6 to M16: 1.0 d, printed in steps of 0.1 to 0.25 d.
        let diameters = required_engagement(&thread, strength) / thread.diameter;
        assert!((diameters - 1.0).abs() < 0.15, "{diameters}");
        assert!(plate_shear_strength("stainless", 205e6) < 0.6 * 515e6);
        assert!((plate_shear_strength("aluminium", 276e6) / 159.3e6 - 1.0).abs() < 1e-3);
        assert!((plate_shear_strength("steel", 700e6) / 404.1e6 - 1.0).abs() < 1e-3);
    }

    #[test]
    fn soft_plates_ask_for_longer_threads() {
        let [steel, brass, light] = ["steel", "brass", "aluminium"].map(rule_of_thumb);
        assert!(steel < brass && brass < light);
        assert!((rule_of_thumb("unobtainium") - light).abs() < f64::EPSILON);
    }

    #[test]
    fn insert_needs_one_diameter_where_a_tapped_light_alloy_needs_two() {
        let part = ThreadedPart {
            family: "aluminium".into(),
            shear_strength: None,
        };
        let mut fastener = m6();
        assert!(engagement_check(&fastener, &part).is_none());
        fastener.engagement = Engagement::Tapped { length: 9e-3 };
        assert!(engagement_check(&fastener, &part).unwrap().is_short());
        fastener.engagement = Engagement::Insert { length: 9e-3 };
        assert!(!engagement_check(&fastener, &part).unwrap().is_short());
        let weak = ThreadedPart {
            shear_strength: Some(20e6),
            ..part
        };
        assert!(engagement_check(&fastener, &weak).unwrap().is_short());
    }

    /// Inch thread by its formulas, from the diameter in inches and the threads per inch.
    fn unified(diameter: f64, per_inch: f64) -> Thread {
        let mut thread = metric(diameter * INCH, INCH / per_inch);
        thread.inch = true;
        thread
    }

    #[test]
    fn inch_limits_are_those_of_the_tables_of_asme_b1_1() {
        // 2A and 2B limits in inches. #4-40 from memory; nut limits of the others seen in UNC tables, their bolt
        // limits from memory. Tables print 0.0001 in, the minor diameter of the larger ones 0.001 in; the
        // standard rounds allowance and tolerance one by one, so that one unit is asked.
        for (diameter, per_inch, printed) in [
            (0.112, 40.0, [0.0939, 0.0991, 0.0925, 0.1061]),
            (0.25, 20.0, [0.207, 0.2224, 0.2127, 0.2408]),
            (0.5, 13.0, [0.434, 0.4565, 0.4435, 0.4876]),
        ] {
            let limits = ThreadLimits::of(&unified(diameter, per_inch));
            let minor = if diameter < 0.2 { 1e-4 } else { 1e-3 };
            for ((found, printed), unit) in [
                limits.nut_minor_most,
                limits.nut_pitch_most,
                limits.bolt_pitch_least,
                limits.bolt_major_least,
            ]
            .into_iter()
            .zip(printed)
            .zip([minor, 1e-4, 1e-4, 1e-4])
            {
                let found = found / INCH;
                assert!(
                    (found - printed).abs() < unit,
                    "{diameter}: {found} {printed}"
                );
            }
        }
    }

    #[test]
    fn inch_tolerances_follow_the_formula_of_the_standard() {
        // #4-40 worked by hand in inches: D 0.112, P 0.025, P^(2/3) 0.0854988; T = 0.0015 (0.482028 + 0.334664)
        // + 0.015 · 0.0854988 = 0.0025075. Six digits of hand work: 1e-4.
        let found = inch_tolerances(&unified(0.112, 40.0));
        for (found, hand) in [
            (found.allowance, 0.000_752_25),
            (found.bolt_pitch, 0.002_507_5),
            (found.bolt_major, 0.005_129_9),
            (found.nut_pitch, 0.003_259_8),
            (found.nut_minor, 0.008_971_4),
        ] {
            assert!((found / INCH / hand - 1.0).abs() < 1e-4, "{found} {hand}");
        }
        // 3/8-16, P 0.0625: P^(2/3) 0.157490, T = 0.0015 (0.721125 + 0.612372) + 0.015 · 0.157490 = 0.0043626;
        // nut minor 0.015625 − 0.0015625.
        let found = inch_tolerances(&unified(0.375, 16.0));
        for (found, hand) in [
            (found.allowance, 0.001_308_8),
            (found.bolt_pitch, 0.004_362_6),
            (found.bolt_major, 0.009_449_4),
            (found.nut_pitch, 0.005_671_4),
            (found.nut_minor, 0.014_062_5),
        ] {
            assert!((found / INCH / hand - 1.0).abs() < 1e-4, "{found} {hand}");
        }
    }
}
