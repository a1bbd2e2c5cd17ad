//! What must hold for every joint, whatever the numbers.

use proptest::prelude::*;
use ringsum::{
    estimate::{Chain, Estimate, Options, Realisation, State},
    joint::{self, Engagement, Heating, Joint, Outline, Source, Tightening, Zone},
    uncertainty::{self, SweepOptions, torque_sweep},
};

const BOX: &str = include_str!("../joints/converter_box.toml");

fn converter_box() -> Joint {
    joint::read(BOX).expect("the demo joint is good")
}

fn state(joint: &Joint) -> State {
    let chain = Chain::new(joint).expect("a chain");
    chain.state(0, &Realisation::default()).expect("a state")
}

fn with_torque(mut joint: Joint, torque: f64) -> Joint {
    for group in &mut joint.fasteners {
        if let Tightening::Torque(tightening) = &mut group.tightening {
            tightening.torque = torque;
        }
    }
    joint
}

fn with_roughness(mut joint: Joint, factor: f64) -> Joint {
    for plate in &mut joint.plates {
        let roughness = &mut plate.finish.roughness;
        for value in [
            &mut roughness.low,
            &mut roughness.nominal,
            &mut roughness.high,
        ] {
            *value *= factor;
        }
    }
    joint
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 24,
        rng_seed: proptest::test_runner::RngSeed::Fixed(1),
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    /// Wherever the bolts stand, also where edges and neighbours cut their fields.
    #[test]
    fn pressure_carries_the_clamp_force(
        x in 0.006..0.060f64,
        y in 0.006..0.050f64,
        pitch in 0.013..0.090f64,
    ) {
        let mut joint = converter_box();
        joint.fasteners[0].places = vec![[x, y], [x + pitch, y]];
        let chain = Chain::new(&joint).expect("a chain");
        let state = chain.state(0, &Realisation::default()).expect("a state");
        let carried = chain.pressure(0, &state).expect("a pressure").force;
        let clamped: f64 = state.conditions.forces.iter().sum();
        // The field is normalised by the quadrature that also reads it.
        prop_assert!((carried / clamped - 1.0).abs() < 1e-6, "{carried} N of {clamped} N");
    }

    /// In vacuum nothing but the spots carries heat between the faces, and they only grow.
    #[test]
    fn more_torque_never_raises_the_resistance_in_vacuum(
        torque in 0.5..4.0f64,
        more in 1.01..2.0f64,
    ) {
        let [less, more] = [torque, torque * more]
            .map(|torque| state(&with_torque(converter_box(), torque)).path);
        prop_assert!(more.source_to_sink <= less.source_to_sink);
        prop_assert!(more.contact >= less.contact);
    }

    #[test]
    fn doubling_the_roughness_never_lowers_the_resistance(factor in 0.3..3.0f64) {
        let [fine, rough] = [factor, 2.0 * factor]
            .map(|factor| state(&with_roughness(converter_box(), factor)).path);
        prop_assert!(rough.source_to_sink >= fine.source_to_sink);
        prop_assert!(rough.contact <= fine.contact);
    }

    #[test]
    fn the_order_of_the_bolts_changes_nothing(shift in 1usize..6, reverse: bool) {
        let joint = converter_box();
        let mut moved = joint.clone();
        moved.fasteners[0].places.rotate_left(shift);
        if reverse {
            moved.fasteners[0].places.reverse();
        }
        let [one, other] = [state(&joint).path, state(&moved).path];
        // Sums over bolts in another order: rounding alone. The plan grid is solved to a residual
        // of 1e-8, so rounding may end it a round earlier or later.
        prop_assert!((one.contact / other.contact - 1.0).abs() < 1e-12);
        prop_assert!((one.source_to_sink / other.source_to_sink - 1.0).abs() < 1e-6);
    }
}

/// A chain moved to another torque is the chain of the joint with that torque.
#[test]
fn another_torque_needs_no_other_geometry() {
    let joint = converter_box();
    let stated = Chain::new(&joint).expect("a chain");
    for torque in [0.4, 2.6, 3.9] {
        let changed = with_torque(joint.clone(), torque);
        let anew = Chain::new(&changed).expect("a chain");
        let moved = stated.with_torque(0, torque).expect("a chain");
        for case in 0..joint.service.cases.len() {
            let at = Realisation {
                friction: 0.3,
                field: -0.5,
                ..Realisation::default()
            };
            let [one, other] =
                [&anew, &moved].map(|chain| chain.state(case, &at).expect("a state"));
            assert_eq!(one.path, other.path, "{torque} N m, case {case}");
        }
    }
}

fn flux(zone: Zone) -> Heating {
    Heating::One(Source {
        zone,
        isothermal: false,
    })
}

/// A ring of 25 µm around a hole, which samples of a grid would miss, against one of 50 µm.
#[test]
fn a_zone_that_shrinks_to_a_hole_moves_the_joint_little() {
    let [thin, wide] = [5.55e-3, 5.6e-3].map(|diameter| {
        let mut joint = converter_box();
        joint.source = flux(Zone::Disc {
            centre: joint.fasteners[0].places[0],
            radius: 0.5 * diameter,
        });
        state(&joint).path.added_by_joint
    });
    // 1.3 % measured; cells brought to no level at all gave 160 %.
    assert!((thin / wide - 1.0).abs() < 0.03, "{thin} {wide}");
}

/// A heated zone narrower than its plate is thick is beyond the grid, and the reader is told.
#[test]
fn a_large_numerical_error_is_cautioned() {
    let mut joint = converter_box();
    joint.source = flux(Zone::Disc {
        centre: joint.fasteners[0].places[0],
        radius: 2.775e-3,
    });
    let options = Options { draws: 0, seed: 1 };
    let found = uncertainty::estimate(&joint, &options).expect("a number");
    let told = |found: &Estimate| {
        let mut codes = found.cautions.iter().map(|caution| caution.code);
        codes.any(|code| code == "resistance/grid-error")
    };
    assert!(found.cases[0].numerical_error > 0.05 && told(&found));
    let sound = uncertainty::estimate(&converter_box(), &options).expect("a number");
    assert!(sound.cases[0].numerical_error < 0.05 && !told(&sound));
}

/// In vacuum more torque always conducts better, so the best torque is the last that passes.
#[test]
fn best_torque_is_the_limit_of_strength() {
    let options = SweepOptions {
        group: 0,
        from: None,
        to: None,
        steps: 9,
        confidence: 0.9,
        chain: Options { draws: 0, seed: 1 },
    };
    let sweep = torque_sweep(&converter_box(), &options).expect("a sweep");
    let passing = sweep.points.iter().filter(|point| point.passes);
    let last = passing.map(|point| point.torque).fold(0.0, f64::max);
    let largest = sweep.largest.expect("a largest torque").0;
    // In vacuum more force is better up to the limit, which lies between two rows.
    assert_eq!(sweep.best, Some(largest));
    assert!(last < largest);
    assert!(sweep.points.iter().any(|point| !point.passes));
}

/// The same joint told in millimetres, newtons, seconds and kelvin (heat then in mW) gives the
/// same physics. A constant that hides a unit breaks this.
///
/// Radiation is switched off: the Stefan-Boltzmann constant is such a constant, and rightly so.
#[test]
fn physics_does_not_know_which_units_it_is_in() {
    const MM: f64 = 1e3;
    let mut metre = converter_box();
    metre.contact.emissivity = vec![[1e-12; 2]];
    let millimetre = in_millimetres(&metre, MM);
    let [metre, millimetre] = [state(&metre), state(&millimetre)];
    let ratio = |one: f64, other: f64| (one / other - 1.0).abs();
    // Powers of ten are not exact in binary: 1e-12 is a few roundings.
    assert!(ratio(metre.conditions.forces[0], millimetre.conditions.forces[0]) < 1e-12);
    assert!(ratio(metre.path.contact * MM, millimetre.path.contact) < 1e-9);
    assert!(
        ratio(
            metre.path.source_to_sink / MM,
            millimetre.path.source_to_sink
        ) < 1e-9
    );
    assert!(ratio(metre.path.node_to_node / MM, millimetre.path.node_to_node) < 1e-9);
}

/// Lengths times `mm`; pressures and moduli over `mm²`; torque times `mm`; conductivity in
/// mW/(mm K) is the same number; a film over `mm`.
fn in_millimetres(joint: &Joint, mm: f64) -> Joint {
    let mut joint = joint.clone();
    let point = |place: &mut [f64; 2]| place.iter_mut().for_each(|x| *x *= mm);
    for plate in &mut joint.plates {
        plate.thickness *= mm;
        point(&mut plate.origin);
        match &mut plate.outline {
            Outline::Rectangle { size } => point(size),
            Outline::Disc { radius } => *radius *= mm,
            Outline::Polygon { points } => {
                *points = points.iter().map(|place| place.map(|x| x * mm)).collect();
            }
        }
        let roughness = &mut plate.finish.roughness;
        for value in [
            &mut roughness.low,
            &mut roughness.nominal,
            &mut roughness.high,
        ] {
            *value *= mm;
        }
        let material = &mut plate.material;
        material.youngs_modulus.value /= mm * mm;
        if let Some(hardness) = &mut material.hardness {
            hardness.value /= mm * mm;
            hardness.range = None;
        }
    }
    if let Heating::One(Source {
        zone: Zone::Rectangle { centre, size },
        ..
    }) = &mut joint.source
    {
        point(centre);
        point(size);
    }
    if let joint::Cooling::Whole(joint::Sink::Film(film)) = &mut joint.sink {
        // mW/(mm² K) = W/(m² K) · 10³/10⁶.
        *film /= mm;
    }
    for group in &mut joint.fasteners {
        let thread = &mut group.thread;
        for length in [
            &mut thread.diameter,
            &mut thread.pitch,
            &mut thread.pitch_diameter,
            &mut thread.minor_diameter,
            &mut thread.nut_minor_diameter,
            &mut thread.stress_diameter,
            &mut group.friction_radius,
            &mut group.washer_thickness,
        ] {
            *length *= mm;
        }
        thread.stress_area *= mm * mm;
        for seat in [Some(&mut group.head_seat), group.nut_seat.as_mut()]
            .into_iter()
            .flatten()
        {
            seat.inner_radius *= mm;
            seat.outer_radius *= mm;
        }
        group
            .hole_radius
            .iter_mut()
            .for_each(|radius| *radius *= mm);
        group.places.iter_mut().for_each(point);
        group.grade.youngs_modulus /= mm * mm;
        assert!(matches!(group.engagement, Engagement::Nut));
        if let Tightening::Torque(tightening) = &mut group.tightening {
            tightening.torque *= mm;
            tightening.running *= mm;
        }
    }
    joint
}
