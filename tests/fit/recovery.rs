//! Unknowns of made joints are found again as often as their intervals say.

use crate::answer;
use nalgebra::DMatrix;
use ringsum::{
    estimate::{Chain, Choice, Fineness, Realisation, Watch},
    fit::{
        likelihood::{Likelihood, Nuisance, Target},
        profile::{Curve, Profile, Range},
        unknown::{Bench, Load, Question},
    },
    joint::{self, Plane},
    numerics::{sampling::Sobol, special::normal_quantile},
    uncertainty::inputs,
};
use std::fs;

const FILE: &str = "joints/rig_coupon.toml";
const LOADS: [f64; 3] = [8.0, 14.0, 20.0];
const SIGMA: f64 = 0.03;
const SETS: u32 = 500;

/// Uniform numbers that no draw of the fit uses.
fn uniform(index: u32, count: usize) -> Vec<f64> {
    let mut point = vec![0.0; count];
    Sobol::new(count, 77).point(index, &mut point);
    point
}

/// Joints are made with every other input drawn through the whole chain, not by its moments.
#[test]
fn a_known_roughness_is_recovered_in_nine_of_ten() {
    let text = fs::read_to_string(FILE).expect("the joint is there");
    let read =
        |sets: &[String]| joint::read_with(&text, sets).map_err(|found| format!("{found:?}"));
    let bench = Bench {
        reader: &read,
        choice: Choice::Cone,
        watch: Watch::none(),
        case: 0,
    };
    let (unknown, range) = bench
        .unknown("roughness", [Some("Rq 0.1 µm"), Some("Rq 10 µm")])
        .expect("a field");
    let asked = Question {
        unknown,
        range,
        plane: Plane::Contact,
        draws: 0,
        seed: 1,
    };
    let loads = LOADS.map(Load::Torque);
    let shares: Vec<f64> = (0..41).map(|at| f64::from(at) / 40.0).collect();
    let values: Vec<f64> = shares.iter().map(|share| range.at(*share)).collect();
    let models = bench.models(&asked, &loads, &values).expect("numbers");
    let mut curve = Curve::default();
    for (share, model) in shares.iter().zip(models) {
        curve.insert(*share, model);
    }
    // The truth is Rq 0.8 µm; what other inputs do is worked out there from draws of its own.
    let truth = 0.8_f64;
    let joint = read(&asked.unknown.sets(truth)).expect("a joint");
    let chain = Chain::new(&joint).expect("a chain");
    let known = inputs(&chain);
    let drawn = |points: &mut dyn FnMut(u32) -> Vec<f64>, count: u32| -> Vec<Vec<f64>> {
        let changed = LOADS.map(|torque| chain.with_torque(0, torque).expect("by torque"));
        (0..count)
            .map(|index| {
                let mut at = Realisation::default();
                for (input, quantile) in known.iter().zip(points(index)) {
                    (input.place)(&mut at, quantile);
                }
                let of = |chain: &Chain| chain.state(0, &at).expect("a state").path.contact.ln();
                changed.iter().map(of).collect()
            })
            .collect()
    };
    let sobol = Sobol::new(known.len(), 1);
    let mut own = |index: u32| {
        let mut point = vec![0.0; known.len()];
        sobol.point(index, &mut point);
        point
    };
    let share = (truth / range.from).ln() / (range.to / range.from).ln();
    let nuisance = Nuisance::of(&drawn(&mut own, 512), &curve.at(share));
    let mut other = |index: u32| uniform(index, known.len());
    let made = drawn(&mut other, SETS);
    let mut held = 0;
    for (index, joint) in made.iter().enumerate() {
        let noise = uniform(5000 + index as u32, 3 * LOADS.len());
        let levels: Vec<usize> = (0..9).map(|at| at % 3).collect();
        let target = Target {
            values: levels
                .iter()
                .zip(&noise)
                .map(|(level, u)| joint[*level] + SIGMA * normal_quantile(*u))
                .collect(),
            deviations: Some(vec![SIGMA; 9]),
            levels,
        };
        let likelihood = Likelihood::of(&target, &nuisance, None).expect("positive");
        let [low, high] = Profile::of(&curve, &likelihood, &target).interval;
        held += u32::from(low <= share && share <= high);
    }
    let found = f64::from(held) / f64::from(SETS);
    // 90 % of 500 by chance: ± 2.2 % at 90 % confidence.
    assert!((0.87..=0.93).contains(&found), "{found}");
}

#[test]
fn a_friction_is_found_from_exact_readings_and_refinement_is_checked() {
    // Readings of the model itself, at a friction of 0.15 where the file states 0.11 to 0.13.
    let text = fs::read_to_string(FILE).expect("the joint is there");
    let sets = [
        "fastener.friction.thread=0.15",
        "fastener.friction.head=0.15",
    ];
    let sets = sets.map(str::to_owned);
    let joint = joint::read_with(&text, &sets).expect("a joint");
    let chain = Chain::new(&joint).expect("a chain");
    let rows: Vec<String> = LOADS
        .iter()
        .map(|torque| {
            let chain = chain.with_torque(0, *torque).expect("by torque");
            let state = chain.state(0, &Realisation::default()).expect("a state");
            format!("{torque}, {}, 0.5\n", state.path.source_to_sink)
        })
        .collect();
    let rows = rows.concat();
    let found = answer(
        FILE,
        &[],
        ("friction", ["0.06", "0.35"]),
        &format!("torque [N·m], R [K/W], sigma [%]\n{rows}"),
    );
    let range = Range::new(0.06, 0.35);
    let [low, high] = found.profile.interval.map(|share| range.at(share));
    assert!(low < 0.15 && 0.15 < high, "{low} {high}");
    assert!(found.nodes.len() > 21, "{}", found.nodes.len());
    // Interpolation was held against the model at the top and the ends: far below 0.5 %.
    assert!(found.interpolation < 5e-4, "{}", found.interpolation);
    assert!(
        found.inputs.iter().all(|name| *name != "friction"),
        "{:?}",
        found.inputs
    );
}

#[test]
fn readings_without_sigma_tell_their_own_scatter() {
    let target = Target {
        values: vec![0.10, 0.13, 0.07, 0.11, 0.09],
        levels: vec![0; 5],
        deviations: None,
    };
    let (scatter, freedom) = target.scatter(&[0.0]).expect("five readings");
    // Σ (d − 0.1)² = 0.0020 on 5 − 2 degrees; by hand.
    assert!((scatter - (0.0020_f64 / 3.0).sqrt()).abs() < 1e-12);
    assert!((freedom - 3.0).abs() < 1e-12);
    let nuisance = Nuisance {
        offset: vec![0.0],
        covariance: DMatrix::zeros(1, 1),
    };
    let likelihood =
        Likelihood::of(&target, &nuisance, Some((scatter, freedom))).expect("positive");
    // Student's t with three degrees at 95 %: 2.353363, tables.
    assert!((likelihood.threshold.sqrt() - 2.353363).abs() < 1e-5);
}

/// On a solved field too: readings made with the roughness of the file, Rq 1.131 µm, lead back to it.
///
/// The conductances are the field's own, by `estimate --resolution fast` at three forces, with five digits.
/// The other inputs are integrated out about their means, of which settling and relaxation are no nominal
/// values: half of them takes force, for which a face 2 % smoother makes up.
#[test]
fn a_roughness_is_found_again_on_a_solved_field() {
    let choice = Choice::elastic(Fineness::Fast, 1_000_000_000);
    let points =
        "force [kN], conductance [W/K], sigma [%]\n1, 2.2274, 1\n2, 2.4235, 1\n4, 2.5680, 1\n";
    let ends = ["Rq 0.2 µm", "Rq 5 µm"];
    let file = "tests/data/joints/round_single.toml";
    let found = crate::answer_with(file, &[], ("roughness", ends), (choice, 64, points));
    assert_eq!(found.field, "elastic");
    let value = |share: f64| 0.2 * 25.0_f64.powf(share);
    let best = value(found.profile.best);
    assert!((best / 1.131_37 - 1.0).abs() < 0.04, "{best}");
    let [low, high] = found.profile.interval.map(value);
    assert!(low < 1.0 && high > 1.3 && high < 4.0, "{low} {high}");
    assert!(found.cautions.is_empty(), "{:?}", found.cautions);
}
