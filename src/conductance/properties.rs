//! What must hold for any interface.

use proptest::prelude::*;

use crate::{
    conductance::{Face, GapGas, Hardness, Interface, Layer, Local},
    joint::{FillerKind, Law},
};

fn face() -> impl Strategy<Value = Face> {
    let hardness = prop_oneof![
        (8.0..10.0f64).prop_map(|power| Hardness::Meyer(10f64.powf(power))),
        (3e9..7e9f64, -0.3..-0.1f64).prop_map(|(c1, c2)| Hardness::Micro { c1, c2 }),
    ];
    let coating = proptest::option::weighted(
        0.4,
        (-8.0..-4.0f64, 0.5..400.0f64, 7.0..10.0f64, any::<bool>()).prop_map(
            |(thickness, conductivity, hardness, metal)| Layer {
                thickness: 10f64.powf(thickness),
                conductivity,
                hardness: metal.then_some(10f64.powf(hardness)),
                metal,
            },
        ),
    );
    (
        1.0..400.0f64,
        -7.0..-5.0f64,
        0.03..0.3f64,
        hardness,
        coating,
    )
        .prop_map(|(conductivity, roughness, slope, hardness, coating)| Face {
            conductivity,
            roughness: 10f64.powf(roughness),
            slope,
            youngs_modulus: 70e9,
            poisson: 0.33,
            hardness,
            emissivity: 0.2,
            coating,
        })
}

fn law() -> impl Strategy<Value = Law> {
    prop_oneof![
        Just(Law::ElasticPlastic),
        Just(Law::Plastic),
        Just(Law::Elastic),
        Just(Law::PlasticPower),
    ]
}

fn gas() -> impl Strategy<Value = Option<GapGas>> {
    proptest::option::of(
        (0.01..0.2f64, -8.0..0.0f64).prop_map(|(conductivity, parameter)| GapGas {
            conductivity,
            parameter: 10f64.powf(parameter),
        }),
    )
}

fn filler() -> impl Strategy<Value = Option<FillerKind>> {
    proptest::option::weighted(
        0.5,
        prop_oneof![
            (0.1..0.3f64).prop_map(|conductivity| FillerKind::Fluid { conductivity }),
            Just(FillerKind::Layer {
                conductivity: 3.0,
                thickness: 1e-3,
                boundary: 1e-5,
            }),
            (20.0..300.0f64).prop_map(|yield_stress| FillerKind::Paste {
                conductivity: 0.8,
                yield_stress,
                thinnest: 20e-6,
                applied: 100e-6,
            }),
            (1e6..1e8f64).prop_map(|hardness| FillerKind::Foil {
                conductivity: 82.0,
                thickness: 1e-4,
                hardness,
            }),
            Just(FillerKind::Table {
                points: vec![(0.0, 4e-4), (7e4, 3.5e-4), (3.5e5, 3e-4)],
            }),
        ],
    )
}

fn interface() -> impl Strategy<Value = Interface> {
    let measured = proptest::option::weighted(
        0.2,
        (1e3..1e6f64, 1e2..1e5f64).prop_map(|(p, h)| vec![(p, h), (10.0 * p, 5.0 * h)]),
    );
    (
        [face(), face()],
        law(),
        gas(),
        filler(),
        measured,
        (0.5..2.0f64, 0.5..2.0f64),
    )
        .prop_map(|(faces, law, gas, filler, measured, factors)| Interface {
            faces,
            law,
            gas,
            temperature: 300.0,
            filler,
            measured,
            solid_factor: factors.0,
            filler_factor: factors.1,
            filler_modulus: None,
        })
}

fn solid(interface: &Interface, pressure: f64) -> f64 {
    interface.prepare().at(pressure).solid
}

/// Pressures from far below contact to far beyond hardness.
fn ladder() -> impl Iterator<Item = f64> {
    std::iter::once(0.0).chain((0..240).map(|step| 10f64.powf(f64::from(step) * 0.06 - 2.0)))
}

fn climbs(local: &Local) -> Result<(), TestCaseError> {
    let mut before = local.unloaded();
    for pressure in ladder() {
        let total = local.total(pressure);
        prop_assert!(total.is_finite());
        // One rounding of the total may go the wrong way where the laws are level.
        prop_assert!(
            total >= before * (1.0 - 1e-14),
            "{pressure}: {total} after {before}"
        );
        before = total;
    }
    Ok(())
}

proptest! {
    #![proptest_config(crate::fixed_cases(256))]

    #[test]
    fn load_never_lowers_the_conductance(interface in interface()) {
        climbs(&interface.prepare())?;
    }

    // 3 % for 1 % of pressure: no law rises faster than its square, up to the end of the spots.
    #[test]
    fn conductance_is_continuous(interface in interface()) {
        let local = interface.prepare();
        for pressure in ladder() {
            let (here, there) = (local.total(pressure), local.total(1.01 * pressure));
            prop_assert!(there <= 1.03 * here, "{pressure}: {here} to {there}");
        }
        let (none, least) = (local.unloaded(), local.total(1e-9));
        prop_assert!((least - none).abs() <= 1e-3 * none + 1e-6, "{none} to {least}");
    }

    #[test]
    fn opening_never_raises_the_conductance(interface in interface()) {
        let local = interface.prepare();
        let mut before = local.unloaded();
        for step in 0..60 {
            let parted = local.parted(1e-8 * 10f64.powf(f64::from(step) * 0.1));
            prop_assert!(parted.is_finite() && parted >= 0.0 && parted <= before);
            before = parted;
        }
    }

    #[test]
    fn parts_add_up_to_the_total(interface in interface(), power in -2.0..10.0f64) {
        let parts = interface.prepare().at(10f64.powf(power));
        let parallel = parts.solid + parts.gas + parts.radiation + parts.filler;
        let total = (parallel.recip() + parts.series.recip()).recip();
        prop_assert!((total / parts.total - 1.0).abs() < 1e-12, "{parts:?}");
    }

    #[test]
    fn spots_follow_their_surface(
        interface in interface(),
        power in 4.0..8.0f64,
        more in 1.01..3.0f64,
    ) {
        let mut bare = interface;
        bare.filler = None;
        bare.measured = None;
        for face in &mut bare.faces {
            face.coating = None;
        }
        let pressure = 10f64.powf(power);
        let here = solid(&bare, pressure);
        let mut better = bare.clone();
        better.faces[0].conductivity *= more;
        prop_assert!(solid(&better, pressure) > here);
        let mut rougher = bare.clone();
        // Hardness that depends on the size of the asperities would mix in here.
        if bare.faces.iter().all(|face| matches!(face.hardness, Hardness::Meyer(_))) {
            rougher.faces[0].roughness *= more;
            prop_assert!(solid(&rougher, pressure) < here);
            if bare.law == Law::Plastic || bare.law == Law::PlasticPower {
                let mut steeper = bare.clone();
                steeper.faces[0].slope *= more;
                prop_assert!(solid(&steeper, pressure) > here);
            }
            let mut harder = bare.clone();
            for face in &mut harder.faces {
                if let Hardness::Meyer(hardness) = &mut face.hardness {
                    *hardness *= more;
                }
            }
            prop_assert!(solid(&harder, pressure) <= here);
        }
    }

    #[test]
    fn factors_act_on_their_own_part(interface in interface(), pressure in 1e4..1e7f64) {
        let mut plain = interface;
        // Below the first measured point the value blends into what crosses without load.
        let first = plain.measured.as_ref().map_or(0.0, |points| points[0].0);
        let pressure = pressure.max(first);
        plain.solid_factor = 1.0;
        plain.filler_factor = 1.0;
        let mut scattered = plain.clone();
        scattered.solid_factor = 1.7;
        scattered.filler_factor = 0.8;
        let (plain, scattered) = (plain.prepare().at(pressure), scattered.prepare().at(pressure));
        prop_assert!((scattered.filler * 0.8 - plain.filler).abs() <= 1e-12 * plain.filler);
        prop_assert!((scattered.solid / 1.7 - plain.solid).abs() <= 1e-12 * plain.solid);
        prop_assert!((scattered.gas - plain.gas).abs() <= 1e-12 * plain.gas);
    }
}
