//! Every limit of a tightened bolt, its use at the highest force, and the largest torque they allow.

use crate::{
    catalog::{Datum, Material},
    joint::{Engagement, Fastener, Joint, Tightening},
    preload::{
        engagement::{PairStrength, ThreadedPart, plate_shear_strength, strip_width},
        force::{Place, balance, clamp_force, force_band, tool_factor, torsion},
        strength::{
            Load, TorsionRule, Twist, force_at_stress, proof_load, seat_pressure, von_mises,
        },
    },
};

/// Part of the yield strength that the equivalent stress may use at assembly, 1.
///
/// Source: VDI 2230-1, the utilisation of its tables.
pub const UTILISATION: f64 = 0.9;

/// What a bolt presses on and is screwed into.
#[derive(Clone, Debug, PartialEq)]
pub struct Supports {
    /// Permissible pressure of the plate under the head, Pa, where known.
    pub head_limit: Option<f64>,
    /// Permissible pressure of the plate under the nut, Pa, where known.
    pub nut_limit: Option<f64>,
    /// The far plate as the partner of a tapped thread or an insert.
    pub far: ThreadedPart,
}

impl Supports {
    /// Supports from the material under the head and that of the far plate.
    ///
    /// The shear strength of the far plate is that of [`plate_shear_strength`].
    pub fn of(head: &Material, far: &Material) -> Self {
        let value = |datum: &Option<Datum>| datum.as_ref().map(|datum| datum.value);
        Self {
            head_limit: value(&head.bearing_limit),
            nut_limit: value(&far.bearing_limit),
            far: ThreadedPart {
                family: far.family.clone(),
                shear_strength: value(&far.yield_strength)
                    .map(|strength| plate_shear_strength(&far.family, strength)),
            },
        }
    }

    /// Supports of a fastener in its joint.
    pub fn in_joint(joint: &Joint, fastener: &Fastener) -> Self {
        let head = &joint.plates[fastener.head_plate].material;
        let far = if fastener.head_plate == 0 {
            &joint.cold().material
        } else {
            &joint.warm().material
        };
        Self::of(head, far)
    }
}

/// The limit of combined stress.
pub const STRESS: &str = "combined stress at 90 % of yield";
/// The limit of the proof load.
pub const PROOF: &str = "proof load";
/// The limit of pressure under the head.
pub const HEAD_PRESSURE: &str = "pressure under the head";
/// The limit of pressure under the nut.
pub const NUT_PRESSURE: &str = "pressure under the nut";
/// The limit of thread stripping.
pub const STRIPPING: &str = "thread stripping";

/// A limit and how far it is used at the highest force.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LimitUse {
    /// Name for people; one of the constants of this module.
    pub name: &'static str,
    /// Load over strength, 1; for the combined stress over yield.
    pub used: f64,
    /// Most that may be used, 1.
    pub allowed: f64,
    /// Whether the limit holds.
    pub passes: bool,
}

/// Equivalent stress over yield at nominal and at the highest force, 1; none without a yield strength.
///
/// The highest force stands at lowest friction and upper tool tolerance; with a given preload friction and
/// force are independent, so the highest use takes the highest friction of class B.
/// Running torque twists the bolt and counts. Rule k = 1.5 of VDI 2230 from 2001 on.
pub fn strength_use(fastener: &Fastener) -> Option<[f64; 2]> {
    let yield_strength = fastener.grade.yield_strength.as_ref()?.value;
    Some([Place::NOMINAL, worst(fastener)].map(|place| stress(fastener, place) / yield_strength))
}

/// Equivalent stress at assembly at a place of the scatter, Pa.
pub fn stress(fastener: &Fastener, place: Place) -> f64 {
    von_mises(
        &fastener.thread,
        Load {
            force: clamp_force(fastener, place),
            torsion: torsion(fastener, place),
        },
        TorsionRule::Plastic,
    )
}

/// Every limit that the data allow to judge, at the highest force.
///
/// Combined stress needs a yield strength, the proof load a proof stress, seat pressures a limit of the plate,
/// stripping a tapped thread or insert in a plate of known yield strength. A nut matches its bolt by standard.
pub fn limits(fastener: &Fastener, supports: &Supports) -> Vec<LimitUse> {
    let force = force_band(fastener).high;
    let mut found = Vec::new();
    if let Some([_, high]) = strength_use(fastener) {
        found.push(limit_use(STRESS, high, UTILISATION));
    }
    found.extend(
        force_limits(fastener, supports)
            .into_iter()
            .map(|(name, most)| limit_use(name, force / most, 1.0)),
    );
    found
}

/// Largest nominal torque at which every limit of [`limits`] holds, N m, and the limit that ends it.
///
/// ```text
/// T = (F_max lever(μ_low) + T_run) / (1 + t)
/// ```
///
/// `F_max` is the smallest of: equivalent stress 0.9 `R_p` with its torsion, proof load, seat pressures and
/// stripping; at lowest friction and upper tool tolerance `t`. None when the preload is given, the grade has
/// no yield strength, or the running torque alone exceeds the stress.
///
/// Valid: an estimate from minimum strengths, no torque card; external load, fatigue and slip are not in it.
/// Source: VDI 2230-1 (90 % of yield), the limits by their own functions.
/// Checked: `largest_torque_stands_exactly_at_its_limit`.
pub fn largest_torque(fastener: &Fastener, supports: &Supports) -> Option<(f64, &'static str)> {
    let Tightening::Torque(tightening) = &fastener.tightening else {
        return None;
    };
    let yield_strength = fastener.grade.yield_strength.as_ref()?.value;
    let place = Place::HIGHEST_FORCE;
    let balance = balance(fastener, tightening, place);
    let by_stress = force_at_stress(
        &fastener.thread,
        Twist {
            lever: balance.levers.thread,
            running: balance.running,
        },
        UTILISATION * yield_strength,
    )?;
    let (force, name) = force_limits(fastener, supports).into_iter().fold(
        (by_stress, STRESS),
        |(force, name), (other, most)| {
            if most < force {
                (most, other)
            } else {
                (force, name)
            }
        },
    );
    Some((balance.torque(force) / tool_factor(tightening, place), name))
}

/// Largest force of each limit that knows no torsion, N.
fn force_limits(fastener: &Fastener, supports: &Supports) -> Vec<(&'static str, f64)> {
    let mut found = Vec::new();
    let thread = &fastener.thread;
    if let Some(proof) = &fastener.grade.proof {
        found.push((PROOF, proof_load(thread, proof.value)));
    }
    if let Some(limit) = supports.head_limit {
        found.push((
            HEAD_PRESSURE,
            limit / seat_pressure(&fastener.head_seat, 1.0),
        ));
    }
    if let (Some(limit), Some(seat)) = (supports.nut_limit, &fastener.nut_seat) {
        found.push((NUT_PRESSURE, limit / seat_pressure(seat, 1.0)));
    }
    if let (Engagement::Tapped { length } | Engagement::Insert { length }, Some(plate_shear)) =
        (fastener.engagement, supports.far.shear_strength)
    {
        let strength = PairStrength {
            bolt_tensile: fastener.grade.tensile.value,
            plate_shear,
        };
        found.push((STRIPPING, length * strip_width(thread, strength)));
    }
    found
}

fn limit_use(name: &'static str, used: f64, allowed: f64) -> LimitUse {
    LimitUse {
        name,
        used,
        allowed,
        // The largest torque stands on its limit: rounding must not push it over.
        passes: used <= allowed * (1.0 + 1e-9),
    }
}

/// Where the use is highest: the highest force, and for a given preload the highest friction with it.
fn worst(fastener: &Fastener) -> Place {
    match fastener.tightening {
        Tightening::Torque(_) => Place::HIGHEST_FORCE,
        Tightening::Preload(_) => Place {
            friction: 1.0,
            ..Place::HIGHEST_FORCE
        },
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{
        joint::{Bounds, Friction},
        preload::fixture::{aluminium, datum, m6, m6_with},
    };

    fn supports() -> Supports {
        Supports::of(&aluminium(), &aluminium())
    }

    fn at_torque(fastener: &Fastener, torque: f64) -> Fastener {
        let mut fastener = fastener.clone();
        if let Tightening::Torque(tightening) = &mut fastener.tightening {
            tightening.torque = torque;
        }
        fastener
    }

    #[test]
    fn largest_torque_stands_exactly_at_its_limit() {
        let nut_factor = Friction::NutFactor(Bounds::uniform([0.12, 0.16, 0.2]));
        let mut soft = supports();
        soft.head_limit = Some(150e6);
        let mut tapped = m6();
        tapped.engagement = Engagement::Tapped { length: 4e-3 };
        tapped.nut_seat = None;
        let mut weak = supports();
        weak.far.shear_strength = Some(60e6);
        let mut low_proof = m6();
        low_proof.grade.proof = Some(datum(300e6));
        let mut soft_nut = supports();
        soft_nut.nut_limit = Some(120e6);
        for (fastener, supports, ends) in [
            (m6(), supports(), STRESS),
            (m6_with(|t| t.running = 1.5), supports(), STRESS),
            (m6_with(|t| t.scatter = Some(0.3)), supports(), STRESS),
            (m6_with(|t| t.friction = nut_factor), supports(), STRESS),
            (low_proof, supports(), PROOF),
            (m6(), soft, HEAD_PRESSURE),
            (m6(), soft_nut, NUT_PRESSURE),
            (tapped, weak, STRIPPING),
        ] {
            let (torque, name) = largest_torque(&fastener, &supports).unwrap();
            assert_eq!(name, ends);
            let found = limits(&at_torque(&fastener, torque), &supports);
            assert!(found.iter().all(|limit| limit.passes), "{found:?}");
            let ending = found.iter().find(|limit| limit.name == name).unwrap();
            // The inverse of the same formulas: rounding alone.
            assert!(
                (ending.used / ending.allowed - 1.0).abs() < 1e-9,
                "{found:?}"
            );
            let above = limits(&at_torque(&fastener, 1.001 * torque), &supports);
            assert!(above.iter().any(|limit| !limit.passes));
        }
    }

    #[test]
    fn largest_torque_of_an_m6_is_the_vdi_torque_at_lowest_friction_less_the_tolerance() {
        // VDI 2230-1:2001 formula, coarse M6 8.8 at friction 0.08: 7.66 N·m, three digits.
        let (torque, _) = largest_torque(&m6(), &supports()).unwrap();
        assert!((torque * 1.05 / 7.66 - 1.0).abs() < 0.002, "{torque}");
    }

    #[test]
    fn nothing_is_promised_without_torque_or_yield_strength() {
        let mut given = m6();
        given.tightening = Tightening::Preload(Bounds::exact(5e3));
        assert_eq!(largest_torque(&given, &supports()), None);
        let mut unknown = m6();
        unknown.grade.yield_strength = None;
        assert_eq!(largest_torque(&unknown, &supports()), None);
        assert_eq!(strength_use(&unknown), None);
        assert!(
            limits(&unknown, &supports())
                .iter()
                .any(|limit| limit.name == PROOF)
        );
    }

    #[test]
    fn running_torque_beyond_the_bolt_leaves_no_torque() {
        let stuck = m6_with(|tightening| tightening.running = 60.0);
        assert_eq!(largest_torque(&stuck, &supports()), None);
        assert!(!limits(&stuck, &supports())[0].passes);
    }

    #[test]
    fn torsion_costs_a_bolt_a_seventh_of_its_strength() {
        let [nominal, high] = strength_use(&m6()).unwrap();
        let tension = force_band(&m6()).nominal / (20.12e-6 * 640e6);
        // At friction 0.12 the VDI 2230-1:2001 formula gives M6: 0.9 · 640 MPa · 20.12 mm² / 10 150 N = 1.142.
        assert!(
            (nominal / tension - 1.142).abs() < 0.005,
            "{}",
            nominal / tension
        );
        assert!(nominal < high);
    }

    #[test]
    fn given_preload_is_judged_at_the_highest_friction_of_its_class() {
        let mut given = m6();
        given.tightening = Tightening::Preload(Bounds::exact(7e3));
        let [nominal, high] = strength_use(&given).unwrap();
        assert!(nominal < high);
    }
}
