//! Every limit of a tightened bolt, its use at the highest force, and the largest torque they allow.

use crate::{
    catalog::{Datum, Material},
    joint::{Engagement, Facing, Fastener, Joint, Tightening},
    preload::{
        brittle::seat_limit,
        engagement::{PairStrength, ThreadedPart, parent_width, plate_shear_strength, strip_width},
        external::stress_in_service,
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
    /// Mean pressure under head and nut at which a brittle plate of stated strength is used up, Pa.
    pub brittle: [Option<f64>; 2],
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
            brittle: [None; 2],
            far: ThreadedPart {
                family: far.family.clone(),
                shear_strength: value(&far.yield_strength)
                    .map(|strength| plate_shear_strength(&far.family, strength)),
            },
        }
    }

    /// Supports of a fastener in its joint.
    pub fn in_joint(joint: &Joint, fastener: &Fastener) -> Self {
        let last = joint.plates.len() - 1;
        let [head, far] = [fastener.head_plate, last - fastener.head_plate];
        let material = |plate: usize| &joint.plates[plate].material;
        let brittle = |plate: usize| seat_limit(&joint.plates[plate], unevenness(joint, plate));
        Self {
            brittle: [head, far].map(brittle),
            ..Self::of(material(head), material(far))
        }
    }
}

/// Out-of-flatness that a plate is pressed flat from, both faces of its interface together, m; none where
/// neither states any.
///
/// [`Joint::out_of_flat`] of each; of a plate between others the larger side.
pub fn unevenness(joint: &Joint, plate: usize) -> Option<f64> {
    let sides = [plate.checked_sub(1), Some(plate)];
    let heights = sides
        .into_iter()
        .flatten()
        .filter(|side| side + 1 < joint.plates.len())
        .filter_map(|side| {
            let warm = joint.out_of_flat(side, Facing::Cold);
            match (warm, joint.out_of_flat(side + 1, Facing::Warm)) {
                (None, None) => None,
                (one, other) => Some(one.unwrap_or(0.0) + other.unwrap_or(0.0)),
            }
        });
    heights.max_by(f64::total_cmp)
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

/// The limit of the stated pull-out of an insert.
pub const PULL_OUT: &str = "pull-out of the insert";
/// The limit of shear around an insert.
pub const PARENT: &str = "shear around the insert";
/// The limit of a brittle plate under a seat.
pub const BRITTLE: &str = "tension beside the seat of a brittle plate";
/// The limit of stress in service.
pub const IN_SERVICE: &str = "stress in service at yield";
/// The limit of the proof load in service.
pub const PROOF_IN_SERVICE: &str = "proof load in service";

/// Each limit that knows no torsion, at assembly and in service.
const TWINS: [(&str, &str); 6] = [
    (HEAD_PRESSURE, "pressure under the head in service"),
    (NUT_PRESSURE, "pressure under the nut in service"),
    (
        BRITTLE,
        "tension beside the seat of a brittle plate in service",
    ),
    (PULL_OUT, "pull-out of the insert in service"),
    (PARENT, "shear around the insert in service"),
    (STRIPPING, "thread stripping in service"),
];

/// The limit at assembly that a limit in service judges again; none for stress and proof load, which have
/// limits of their own there.
pub fn at_assembly(in_service: &str) -> Option<&'static str> {
    let mut twins = TWINS.into_iter();
    twins
        .find(|(_, name)| *name == in_service)
        .map(|(name, _)| name)
}

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
        found.push(LimitUse::new(STRESS, high, UTILISATION));
    }
    found.extend(
        force_limits(fastener, supports)
            .into_iter()
            .map(|(name, most)| LimitUse::new(name, force / most, 1.0)),
    );
    found
}

/// The limits of a bolt under a force in service, N: equivalent stress at yield with half the torsion of
/// tightening, proof load, and all that seats, threads and inserts bear.
///
/// Head and nut press with the force of the bolt, a load from outside in it: on the safe side where part of
/// the load enters at the head.
pub fn limits_in_service(fastener: &Fastener, supports: &Supports, force: f64) -> Vec<LimitUse> {
    let grade = &fastener.grade;
    let load = Load {
        force,
        torsion: torsion(fastener, worst(fastener)),
    };
    let stress = grade.yield_strength.as_ref().map(|strength| {
        let used = stress_in_service(&fastener.thread, load) / strength.value;
        LimitUse::new(IN_SERVICE, used, 1.0)
    });
    let proof = grade.proof.as_ref().map(|proof| {
        let most = proof_load(&fastener.thread, proof.value);
        LimitUse::new(PROOF_IN_SERVICE, force / most, 1.0)
    });
    let borne = force_limits(fastener, supports)
        .into_iter()
        .filter_map(|(name, most)| {
            let (_, in_service) = TWINS.into_iter().find(|(twin, _)| *twin == name)?;
            Some(LimitUse::new(in_service, force / most, 1.0))
        });
    stress.into_iter().chain(proof).chain(borne).collect()
}

/// Largest nominal torque of each limit that can be told, N m.
///
/// ```text
/// T = (F_max lever(μ_low) + T_run) / (1 + t)
/// ```
///
/// `F_max` is the force at which the limit stands: equivalent stress 0.9 `R_p` with its torsion, proof load,
/// seat pressures, stripping, the hold of an insert; at lowest friction and upper tool tolerance `t`. Empty
/// when the preload is given.
///
/// Valid: tightening alone; loads from outside are in [`limits_in_service`].
/// Source: the parts, [`force_at_stress`] and what this module holds;
/// 0.9 of yield as VDI 2230-1 uses it, from memory.
pub fn limit_torques(fastener: &Fastener, supports: &Supports) -> Vec<(&'static str, f64)> {
    let Tightening::Torque(tightening) = &fastener.tightening else {
        return Vec::new();
    };
    let place = Place::HIGHEST_FORCE;
    let balance = balance(fastener, tightening, place);
    let twist = Twist {
        lever: balance.levers.thread,
        running: balance.running,
    };
    let by_stress = fastener.grade.yield_strength.as_ref().map(|strength| {
        let most = UTILISATION * strength.value;
        // A running torque that alone passes the stress leaves nothing.
        (
            STRESS,
            force_at_stress(&fastener.thread, twist, most).unwrap_or(f64::NEG_INFINITY),
        )
    });
    let forces = by_stress
        .into_iter()
        .chain(force_limits(fastener, supports));
    forces
        .map(|(name, force)| {
            let torque = balance.torque(force) / tool_factor(tightening, place);
            (name, torque.max(0.0))
        })
        .collect()
}

/// Largest nominal torque at which every limit of [`limits`] holds, N m, and the limit that ends it: the
/// smallest of [`limit_torques`].
///
/// None when the preload is given, the grade has no yield strength, or the running torque alone exceeds the
/// stress.
///
/// Valid: an estimate from minimum strengths, no torque card; fatigue and slip are not in it.
/// Source: VDI 2230-1 (90 % of yield), the limits by their own functions.
/// Checked: `largest_torque_stands_exactly_at_its_limit`.
pub fn largest_torque(fastener: &Fastener, supports: &Supports) -> Option<(f64, &'static str)> {
    fastener.grade.yield_strength.as_ref()?;
    let torques = limit_torques(fastener, supports);
    let least = torques
        .into_iter()
        .min_by(|one, other| one.1.total_cmp(&other.1));
    least
        .filter(|(_, torque)| *torque > 0.0)
        .map(|(name, torque)| (torque, name))
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
    let seats = [Some(&fastener.head_seat), fastener.nut_seat.as_ref()];
    for (seat, limit) in seats.into_iter().zip(supports.brittle) {
        if let (Some(seat), Some(limit)) = (seat, limit) {
            found.push((BRITTLE, limit / seat_pressure(seat, 1.0)));
        }
    }
    found.extend(threads(fastener, supports));
    found
}

/// Largest forces of what holds the far end, N: a tapped thread, or an insert and what is around it.
fn threads(fastener: &Fastener, supports: &Supports) -> Vec<(&'static str, f64)> {
    let mut found = Vec::new();
    let hold = &fastener.insert_hold;
    found.extend(hold.pull_out.map(|force| (PULL_OUT, force)));
    let (Engagement::Tapped { length } | Engagement::Insert { length }, Some(plate_shear)) =
        (fastener.engagement, supports.far.shear_strength)
    else {
        return found;
    };
    let thread = &fastener.thread;
    if let (Engagement::Insert { .. }, Some(outer)) = (fastener.engagement, hold.outer_diameter) {
        found.push((PARENT, length * parent_width(outer) * plate_shear));
    } else if hold.pull_out.is_none() {
        let strength = PairStrength {
            bolt_tensile: fastener.grade.tensile.value,
            plate_shear,
        };
        found.push((STRIPPING, length * strip_width(thread, strength)));
    }
    found
}

impl LimitUse {
    /// A limit, what is used of it and what may be used.
    pub fn new(name: &'static str, used: f64, allowed: f64) -> Self {
        Self {
            name,
            used,
            allowed,
            // The largest torque stands on its limit: rounding must not push it over.
            passes: used <= allowed * (1.0 + 1e-9),
        }
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
        preload::fixture::{aluminium, datum, joint, m6, m6_with},
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
        ends_at(&m6(), &supports(), STRESS);
        ends_at(&m6_with(|t| t.running = 1.5), &supports(), STRESS);
        ends_at(&m6_with(|t| t.scatter = Some(0.3)), &supports(), STRESS);
        ends_at(&m6_with(|t| t.friction = nut_factor), &supports(), STRESS);
        ends_at(&low_proof, &supports(), PROOF);
        ends_at(&m6(), &soft, HEAD_PRESSURE);
        ends_at(&m6(), &soft_nut, NUT_PRESSURE);
        ends_at(&tapped, &weak, STRIPPING);
    }

    /// The largest torque uses a limit whole, and more than it breaks one.
    fn ends_at(fastener: &Fastener, supports: &Supports, ends: &str) {
        let (torque, name) = largest_torque(fastener, supports).unwrap();
        assert_eq!(name, ends);
        let found = limits(&at_torque(fastener, torque), supports);
        assert!(found.iter().all(|limit| limit.passes), "{found:?}");
        let ending = found.iter().find(|limit| limit.name == name).unwrap();
        // The inverse of the same formulas: rounding alone.
        assert!(
            (ending.used / ending.allowed - 1.0).abs() < 1e-9,
            "{found:?}"
        );
        let above = limits(&at_torque(fastener, 1.001 * torque), supports);
        assert!(above.iter().any(|limit| !limit.passes));
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

    #[test]
    fn a_limit_in_service_is_used_as_the_force_says() {
        let mut insert = m6();
        insert.engagement = Engagement::Tapped { length: 6e-3 };
        let mut brittle = supports();
        brittle.brittle = [Some(300e6), Some(200e6)];
        let used = |force: f64| limits_in_service(&insert, &brittle, force);
        // Force over force, by hand: 580 MPa on the stress area; 400 MPa under the head, π (4.44² − 3.3²) mm².
        let proof = 580e6 * insert.thread.stress_area;
        let seat = std::f64::consts::PI * (4.44e-3_f64.powi(2) - 3.3e-3_f64.powi(2));
        for force in [0.4 * proof, proof, 1.3 * proof, 2.7 * proof] {
            let found = used(force);
            let of = |name: &str| {
                let limit = found.iter().find(|limit| limit.name == name);
                limit.expect("the limit is judged").used
            };
            assert!((of(PROOF_IN_SERVICE) / (force / proof) - 1.0).abs() < 1e-12);
            let head = of("pressure under the head in service");
            assert!((head / (force / (400e6 * seat)) - 1.0).abs() < 1e-12);
            // Tension over A₀ with half the torsion of tightening over W = π d₀³/12, of 640 MPa; rounding.
            let (diameter, pi) = (insert.thread.stress_diameter, std::f64::consts::PI);
            let tension = force / (pi / 4.0 * diameter.powi(2));
            let twist = 0.5 * torsion(&insert, Place::HIGHEST_FORCE);
            let shear = twist / (pi / 12.0 * diameter.powi(3));
            let stress = (tension.powi(2) + 3.0 * shear.powi(2)).sqrt();
            assert!((of(IN_SERVICE) / (stress / 640e6) - 1.0).abs() < 1e-12);
            // Every limit but the one with torsion grows in proportion to the force.
            for (one, twice) in found.iter().zip(used(2.0 * force)) {
                assert_eq!(one.name, twice.name);
                if one.name != IN_SERVICE {
                    assert!((twice.used / one.used - 2.0).abs() < 1e-12, "{twice:?}");
                }
            }
        }
        // What knows no torsion is used in service as it is at assembly under the same force: rounding alone.
        let assembly = limits(&insert, &brittle);
        let twins: Vec<(f64, f64)> = used(force_band(&insert).high)
            .iter()
            .filter_map(|limit| {
                let name = at_assembly(limit.name)?;
                let twin = assembly.iter().find(|limit| limit.name == name)?;
                Some((limit.used, twin.used))
            })
            .collect();
        // Head, nut, a brittle seat under each, thread; the two brittle ones bear one name, so that only the first
        // is its own twin.
        assert_eq!(twins.len(), 5);
        for (service, twin) in [twins[0], twins[1], twins[2], twins[4]] {
            assert!((service / twin - 1.0).abs() < 1e-12, "{service} {twin}");
        }
    }

    #[test]
    fn brittle_plates_bear_what_their_own_seat_may_press() {
        let mut joint = joint();
        let fastener = m6();
        let unstated = Supports::in_joint(&joint, &fastener);
        assert_eq!(unstated, supports());
        joint.plates[1].flexural_strength = Some(300e6);
        joint.plates[1].material.bearing_limit = None;
        let at_the_nut = Supports::in_joint(&joint, &fastener);
        // A third of 300 MPa over (1 − 2 · 0.33)/2, the fixture's Poisson ratio: 588.2 MPa.
        let [head, nut] = at_the_nut.brittle;
        assert_eq!(head, None);
        assert!((nut.unwrap() / (100e6 / 0.17) - 1.0).abs() < 1e-12);
        assert_eq!(
            [at_the_nut.head_limit, at_the_nut.nut_limit],
            [Some(400e6), None]
        );
        // A bolt from the other side has its head there.
        let mut turned = fastener.clone();
        turned.head_plate = 1;
        let at_the_head = Supports::in_joint(&joint, &turned);
        assert_eq!(at_the_head.brittle, [nut, None]);
        assert_eq!(
            [at_the_head.head_limit, at_the_head.nut_limit],
            [None, Some(400e6)]
        );
        // And between two others a plate bears no seat.
        let mut middle = joint.clone();
        middle.plates.insert(1, middle.plates[0].clone());
        middle.plates.swap(1, 2);
        assert_eq!(Supports::in_joint(&middle, &fastener).brittle, [None; 2]);
        let uneven = {
            joint.plates[0].flatness = Some(10e-6);
            Supports::in_joint(&joint, &fastener).brittle[1]
        };
        assert!(uneven < nut);
    }

    #[test]
    fn a_plate_is_pressed_flat_from_both_faces_of_its_wider_interface() {
        let mut stack = joint();
        stack.plates.push(stack.plates[0].clone());
        let uneven = |joint: &Joint| [0, 1, 2].map(|plate| unevenness(joint, plate));
        assert_eq!(uneven(&stack), [None; 3]);
        stack.plates[0].flatness = Some(10e-6);
        // Nothing is stated of the lower interface, whose warm plate counts nothing.
        assert_eq!(uneven(&stack), [Some(10e-6), Some(10e-6), None]);
        stack.plates[2].flatness = Some(25e-6);
        assert_eq!(uneven(&stack), [Some(10e-6), Some(25e-6), Some(25e-6)]);
        stack.plates[1].flatness = Some(40e-6);
        let [first, middle, last] = uneven(&stack).map(Option::unwrap);
        // 10 + 40 and 40 + 25 µm; sums of a few numbers: rounding.
        assert!((first - 50e-6).abs() < 1e-18 && (last - 65e-6).abs() < 1e-18);
        assert!((middle - 65e-6).abs() < 1e-18);
    }
}
