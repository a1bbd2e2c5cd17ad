//! `ringsum fit`: laws that joint files take as they stand, unknowns that are found or seen not to be.

#[path = "fit/cautions.rs"]
mod cautions;
#[path = "fit/command.rs"]
mod command;
#[path = "fit/recovery.rs"]
mod recovery;

use ringsum::{
    estimate::Choice,
    estimate::Watch,
    fit::{
        Readings, Series,
        block::block,
        series::Form,
        unknown::{self, Answer, Bench, Question},
    },
    joint::{self, Joint, MeasuredKind, Plane},
};
use std::fs;

fn readings(text: &str) -> Readings {
    Readings::read(text).unwrap_or_else(|faults| panic!("{faults:#?}"))
}

/// A joint on the closed-form cone, its unknown fitted to readings.
fn answer(file: &str, sets: &[&str], asked: (&str, [&str; 2]), points: &str) -> Answer {
    answer_with(file, sets, asked, (Choice::Cone, 128, points))
}

/// The same on a field, with so many draws of the other inputs.
fn answer_with(
    file: &str,
    sets: &[&str],
    (asked, ends): (&str, [&str; 2]),
    (choice, draws, points): (Choice, u32, &str),
) -> Answer {
    let text = fs::read_to_string(file).expect("the joint is there");
    let reader = |more: &[String]| {
        let sets: Vec<String> = sets
            .iter()
            .map(|set| (*set).to_owned())
            .chain(more.iter().cloned())
            .collect();
        joint::read_with(&text, &sets).map_err(|faults| format!("{faults:#?}"))
    };
    let bench = Bench {
        reader: &reader,
        choice,
        watch: Watch::none(),
        case: 0,
    };
    let (unknown, range) = bench
        .unknown(asked, ends.map(Some))
        .unwrap_or_else(|found| panic!("{found}"));
    let question = Question {
        unknown,
        range,
        plane: Plane::SourceToSink,
        draws,
        seed: 1,
    };
    unknown::fit(&bench, &question, &readings(points)).unwrap_or_else(|found| panic!("{found}"))
}

fn with_block(file: &str, block: &str) -> Joint {
    let text = fs::read_to_string(file).expect("the joint is there");
    joint::read(&format!("{text}\n{block}")).unwrap_or_else(|faults| panic!("{faults:#?}\n{block}"))
}

/// The conductance that a joint takes from its measured points, log-log between them.
fn of_points(joint: &Joint, pressure: f64) -> f64 {
    let measured = joint.measured.as_ref().expect("the block is read");
    let MeasuredKind::Local { points } = &measured.kind else {
        panic!("points are expected: {measured:?}")
    };
    ringsum::numerics::interpolation::log_log(points, pressure)
}

#[test]
fn a_joint_file_takes_the_block_of_a_pressure_law() {
    let text = fs::read_to_string("joints/rig_coupon_points.csv").expect("the table is there");
    let series = Series::of(&readings(&text), Form::Law).expect("a law");
    assert_eq!(series.branches.len(), 2);
    let branch = series.branch(None).expect("loading");
    let joint = with_block("joints/rig_coupon.toml", &block(&series, branch, 1));
    for pressure in [0.5e6, 1.7e6, 4e6, 10e6] {
        // The block carries four digits at its two ends.
        let share = of_points(&joint, pressure) / branch.shape.at(pressure);
        assert!((share - 1.0).abs() < 2e-4, "{pressure} {share}");
    }
    let factor = joint.measured.expect("measured").factor;
    assert!(
        (factor / branch.shape.factor() - 1.0).abs() < 1e-4,
        "{factor}"
    );
}

#[test]
fn a_joint_file_takes_the_block_of_a_table() {
    let text = fs::read_to_string("joints/rig_coupon_points.csv").expect("the table is there");
    let series = Series::of(&readings(&text), Form::Table).expect("a table");
    let branch = series.branch(None).expect("loading");
    let joint = with_block("joints/rig_coupon.toml", &block(&series, branch, 1));
    for pressure in [0.5e6, 2e6, 5e6, 10e6] {
        let share = of_points(&joint, pressure) / branch.shape.at(pressure);
        // Four digits.
        assert!((share - 1.0).abs() < 2e-4, "{pressure} {share}");
    }
}

/// The ring sum of a joint by a law per bolt, at its stated torque.
fn ring_sum(joint: &Joint) -> (f64, f64) {
    let chain = ringsum::estimate::Chain::new(joint).expect("a chain");
    let state = chain
        .state(0, &ringsum::estimate::Realisation::default())
        .expect("a state");
    (state.path.contact, state.conditions.forces[0])
}

#[test]
fn laws_of_force_and_of_torque_give_the_ring_sum_they_state() {
    let force = "force [kN], G [W/K], sigma [%]\n5, 1.0, 2\n10, 1.9, 2\n20, 3.5, 2\n40, 6.9, 2\n";
    let series = Series::of(&readings(force), Form::Law).expect("a law");
    let law = |x: f64| series.branches[0].shape.at(x);
    let joint = with_block(
        "joints/rig_coupon.toml",
        &block(&series, &series.branches[0], 1),
    );
    let (found, carried) = ring_sum(&joint);
    // Vacuum leaves radiation across the gap beside the law, 0.005 W/K on these coupons; four digits.
    assert!(
        (found / law(carried) - 1.0).abs() < 5e-3,
        "{found} {carried}"
    );

    let torque =
        "torque [N·m], R [K/W], sigma [%]\n5, 0.5, 2\n10, 0.27, 2\n20, 0.14, 2\n30, 0.1, 2\n";
    let series = Series::of(&readings(torque), Form::Law).expect("a law");
    for bolts in [1, 4] {
        let block = block(&series, &series.branches[0], bolts);
        let joint = with_block("joints/rig_coupon.toml", &block);
        let (found, _) = ring_sum(&joint);
        let expected = series.branches[0].shape.at(20.0) / f64::from(bolts);
        assert!(
            (found / expected - 1.0).abs() < 2e-2 / expected.min(1.0),
            "{found} {expected}"
        );
    }
}

#[test]
fn loading_and_unloading_are_kept_apart_and_their_difference_is_told() {
    let text = fs::read_to_string("joints/rig_coupon_points.csv").expect("the table is there");
    let series = Series::of(&readings(&text), Form::Law).expect("laws");
    let found = series.hysteresis.expect("both branches");
    let [low, high] = found.interval.expect("two laws");
    // The readings were made with 10^0.22 between the exponents 0.94 and 0.72 at the middle, 2.2 MPa.
    let made = (10.0_f64 / (found.at * 1e-6)).powf(0.22);
    assert!(low < made && made < high, "{found:?} {made}");
    assert!(
        series
            .cautions
            .iter()
            .any(|told| told.code == "fit/hysteresis")
    );
}

/// Codes of the cautions on a table.
fn codes(text: &str, form: Form) -> Vec<&'static str> {
    let series = Series::of(&readings(text), form).expect("a fit");
    series.cautions.iter().map(|told| told.code).collect()
}

#[test]
fn every_caution_of_a_law_is_produced() {
    let heading = "pressure [MPa], h [W/(m²·K)], sigma [%]\n";
    let rows = |of: &dyn Fn(f64) -> f64, sigma: f64| -> String {
        let rows = (1..=12).map(|at| {
            let p = f64::from(at);
            let wiggle = 1.0 + 0.02 * [1.0, -1.0, 0.5, -0.5][at as usize % 4];
            format!("{p}, {}, {sigma}\n", of(p) * wiggle)
        });
        rows.collect::<Vec<String>>().concat()
    };
    let power = |p: f64| 5000.0 * p.powf(0.9);
    let table = |of: &dyn Fn(f64) -> f64, sigma: f64| format!("{heading}{}", rows(of, sigma));
    let sound = codes(&table(&power, 1.6), Form::Law);
    assert_eq!(sound, ["fit/one-specimen"]);
    assert!(codes(&table(&power, 0.3), Form::Law).contains(&"fit/scatter-understated"));
    assert!(codes(&table(&power, 20.0), Form::Law).contains(&"fit/scatter-overstated"));
    let bent = |p: f64| 1e4 / (0.1 + 1.0 / p);
    assert!(codes(&table(&bent, 1.6), Form::Law).contains(&"fit/curved"));
    let falling = |p: f64| 5000.0 / p;
    assert!(codes(&table(&falling, 1.6), Form::Law).contains(&"fit/falling"));
    let flat = |p: f64| 5000.0 * p.powf(0.001);
    assert!(codes(&table(&flat, 1.6), Form::Law).contains(&"fit/hardly-rising"));
    assert!(codes(&table(&falling, 1.6), Form::Table).contains(&"fit/levelled"));
    let apart = |p: f64| power(p) * if (p - 7.0).abs() < 0.1 { 1.4 } else { 1.0 };
    assert!(codes(&table(&apart, 1.6), Form::Law).contains(&"fit/outlier"));
}

#[test]
fn an_unknown_that_hardly_moves_the_joint_is_seen_not_to_be_determined() {
    // Four M5 through thin plates in vacuum: spreading decides, the faces are a few per cent of it.
    let found = answer(
        "joints/converter_box.toml",
        &[],
        ("roughness", ["Rq 0.3 µm", "Rq 5 µm"]),
        "conductance [W/K], sigma [%]\n5.5, 5\n",
    );
    let codes: Vec<&str> = found.cautions.iter().map(|told| told.code).collect();
    assert!(codes.contains(&"fit/not-determined"), "{found:#?}");
    assert!(
        found.cautions[0].text.contains("spreading"),
        "{}",
        found.cautions[0].text
    );
    assert!(found.contact_share < 0.1, "{}", found.contact_share);
}
