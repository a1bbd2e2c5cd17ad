//! Quantiles beside NumPy, their own sampling error, and what any number of threads gives.

use std::fs;

use ringsum::{
    estimate::{Chain, Options},
    joint::{self, Joint},
    numerics::sampling::{REACH, Tail, quantile},
    uncertainty::{self, Answer, RankingOptions, Target},
};
use serde_json::Value;

fn demo() -> Joint {
    let text = fs::read_to_string("joints/rig_coupon.toml").expect("the demo is there");
    joint::read(&text).expect("the demo is good")
}

// `tests/data/quantiles.py` made the numbers with numpy.quantile and held them against
// scipy.stats.mstats.mquantiles; the samples are the same to the last bit, so that 1e-14 is rounding.
#[test]
fn quantiles_are_those_of_numpy() {
    let text = fs::read_to_string("tests/data/quantiles.json").expect("the file is there");
    let table: Value = serde_json::from_str(&text).expect("JSON");
    let rows = table["rows"].as_array().expect("rows");
    assert_eq!(rows.len(), 9);
    for row in rows {
        let number = |at: usize| row[at].as_f64().expect("a number");
        let (count, p, wanted) = (number(0) as u32, number(1), number(2));
        let sample: Vec<f64> = (1..=count)
            .map(|k| f64::from(k) * 0.618_033_988_749_894_9 % 1.0)
            .map(|v| v / (1.0 - v))
            .collect();
        let mut tail = Tail::around(p, &sample, REACH);
        tail.take(&sample).expect("one part holds its own quantile");
        let (_, streamed) = tail.after(1).expect("one part");
        let mut sorted = sample;
        sorted.sort_by(f64::total_cmp);
        for found in [streamed, quantile(&sorted, p)] {
            assert!(
                (found / wanted - 1.0).abs() < 1e-14,
                "{count} {p}: {found} {wanted}"
            );
        }
    }
}

/// Both quantiles of source to sink with their errors.
fn ends(chain: &Chain, draws: u32, seed: u64) -> ([f64; 2], [f64; 2]) {
    let options = Options { draws, seed };
    let found = uncertainty::draws(chain, (0, &[Answer::SourceToSink]), &options).expect("draws");
    let course = found.course(Answer::SourceToSink);
    assert_eq!(course.len(), 3);
    assert_eq!(course[2].0, draws as usize);
    let error = found
        .errors(Answer::SourceToSink)
        .expect("scramblings enough");
    (course[2].1, error)
}

// Forty seeds of 512 draws about 65 536: the spread of the quantiles over the seeds is what each of
// them tells as its error. A deviation of forty is good to 11 %, the mean of forty errors of fifteen
// degrees of freedom to 3 %, and one part in ten is left for the scramblings that are not quite alike.
#[test]
fn told_error_is_the_spread_over_seeds() {
    let joint = demo();
    let chain = Chain::new(&joint).expect("a chain");
    let (truth, _) = ends(&chain, 65_536, 999);
    for end in 0..2 {
        let (mut squares, mut told) = (0.0, 0.0);
        for seed in 0..40 {
            let (found, error) = ends(&chain, 512, seed);
            squares += (found[end] - truth[end]).powi(2) / 40.0;
            told += error[end].powi(2) / 40.0;
        }
        let ratio = (squares / told).sqrt();
        assert!((0.65..1.45).contains(&ratio), "end {end}: {ratio}");
    }
}

// From 1 000 to 64 000 draws plain random numbers would gain a factor 8.
#[test]
fn more_draws_of_any_number_tell_a_smaller_error() {
    let joint = demo();
    let chain = Chain::new(&joint).expect("a chain");
    let (few, rough) = ends(&chain, 1_000, 1);
    let (many, fine) = ends(&chain, 63_999, 1);
    for end in 0..2 {
        assert!(fine[end] < rough[end] / 4.0, "{rough:?} {fine:?}");
        // Four of its own errors.
        assert!(
            (few[end] - many[end]).abs() < 4.0 * rough[end],
            "{few:?} {many:?}"
        );
    }
}

#[test]
fn any_number_of_threads_gives_the_same_digits() {
    let joint = demo();
    let chain = Chain::new(&joint).expect("a chain");
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build();
        pool.expect("threads").install(|| {
            let options = Options {
                draws: 5_000,
                seed: 3,
            };
            let ranked = RankingOptions {
                target: Target::AddedByJoint,
                draws: Options {
                    draws: 1_000,
                    seed: 3,
                },
            };
            (
                uncertainty::along(&chain, &options).expect("a number"),
                uncertainty::ranking(&chain, &ranked).expect("a ranking"),
            )
        })
    };
    assert_eq!(on(1), on(3));
}

// What knowing an input buys can be found by hand for the contact alone: without scatter of the law
// the rest is left, and an input that does nothing to it buys nothing.
#[test]
fn ranking_finds_what_drives_the_contact() {
    let joint = demo();
    let chain = Chain::new(&joint).expect("a chain");
    let options = RankingOptions {
        target: Target::Contact,
        draws: Options {
            draws: 4096,
            seed: 1,
        },
    };
    let found = uncertainty::ranking(&chain, &options).expect("a ranking");
    let of = |name: &str| {
        let input = found.inputs.iter().find(|each| each.input == name);
        input.unwrap_or_else(|| panic!("{name}: {found:#?}"))
    };
    let field = of("pressure field and spreading model");
    assert!(field.index.total.value.abs() < 1e-12, "{field:?}");
    assert_eq!(field.known, found.band);
    for pair in found.inputs.windows(2) {
        let narrowing = |at: usize| pair[at].narrowing(&found.band);
        // Rounded to a part in a hundred of the band, below which shares decide.
        assert!(narrowing(0) + 0.01 >= narrowing(1), "{pair:?}");
    }
    for input in &found.inputs {
        let (first, total) = (input.index.first, input.index.total);
        let slack = first.confidence + total.confidence + 1e-9;
        assert!(first.value <= total.value + slack, "{input:?}");
    }
    // The law is a factor e^(z ln 1.15) and enters nothing else: a contact of spots alone scales by it.
    let law = of("law of the solid spots");
    let ratio = law.alone[0] / law.alone[1];
    let wanted = 1.15_f64.powf(2.0 * 1.644_853_626_951_472_2);
    assert!(
        (1.0..=wanted * (1.0 + 1e-9)).contains(&ratio),
        "{ratio} {wanted}"
    );
    assert!(
        found.inputs[0].narrowing(&found.band) > 0.02,
        "{:?}",
        found.inputs[0]
    );
}
