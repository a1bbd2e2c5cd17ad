//! A million draws of the whole chain on a solved field, and the same chain and tables in NumPy.
//!
//! `benches/peer/run_draws` makes the Python environment and starts this; without it only our side
//! runs. The field and the surfaces are solved beforehand; what is timed is drawing, the chain from
//! torque to resistance, and the quantiles.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

#[path = "peer/answer.rs"]
mod answer;

use std::time::Instant;

use ringsum::{
    estimate::{Chain, Choice, Fineness, Options, Realisation, Watch},
    joint::{self, Friction, Joint, Tightening},
    numerics::sampling::Sobol,
    preload::torque::Turning,
    uncertainty::{self, Answer, RankingOptions, Target},
};
use serde_json::{Value, json};

/// Four M5 on two plates of 80 mm in vacuum, with all that may scatter about a bare joint.
fn text() -> String {
    include_str!("../tests/data/joints/case_i.toml")
        .replace("plastic-power", "elastic-plastic")
        .replace(
            "{ roughness = \"Rq 1.13137 µm\", slope = 0.1060660 }",
            "{ roughness = \"Ra 0.8 µm\" }",
        )
        .replace(
            "preload = \"5 kN\"",
            "torque = { value = \"4 N·m\", tolerance = \"5 %\" }\nfriction = { class = \"B\" }",
        )
}

const DRAWS: u32 = 1_000_000;
const RUNS: usize = 5;
const PEER_RUNS: usize = 3;
/// Draws whose numbers are held against the peer's.
const COMPARED: u32 = 1000;
/// Largest relative difference from the peer: rounding of its normal quantile and powers.
const AGREED: f64 = 1e-9;

fn main() {
    let joint = joint::read(&text()).expect("the joint is good");
    let choice = Choice::elastic(Fineness::Fast, 1_000_000_000);
    let start = Instant::now();
    let chain = Chain::of(&joint, choice, &Watch::none()).expect("a field");
    chain.expect_draws(0).expect("surfaces");
    println!(
        "field and surfaces solved in {:.1} s",
        start.elapsed().as_secs_f64()
    );
    let cone = Chain::new(&joint).expect("a chain");
    let ours = timed("elastic, all cores", &chain, DRAWS);
    let pool = rayon::ThreadPoolBuilder::new().num_threads(1).build();
    let alone = pool
        .expect("a thread")
        .install(|| timed("elastic, one core", &chain, DRAWS));
    timed("cone, all cores", &cone, DRAWS / 100);
    let ranked = RankingOptions {
        target: Target::SourceToSink,
        draws: Options {
            draws: 100_000,
            seed: 1,
        },
    };
    let start = Instant::now();
    uncertainty::ranking(&chain, &ranked).expect("a ranking");
    println!(
        "  drivers, 100000 base points    {:8.3} s",
        start.elapsed().as_secs_f64()
    );
    match std::env::var("RINGSUM_PEER_PYTHON").ok() {
        Some(python) => peer(&python, &chain, [ours, alone]),
        None => println!("  NumPy: run benches/peer/run_draws to time the peer in the same run"),
    }
}

/// Median of some runs, s.
fn timed(what: &str, chain: &Chain, draws: u32) -> f64 {
    let options = Options { draws, seed: 1 };
    let mut seconds: Vec<f64> = (0..RUNS)
        .map(|_| {
            let start = Instant::now();
            let task = (0, &Answer::ALL[..]);
            std::hint::black_box(uncertainty::draws(chain, task, &options).expect("draws"));
            start.elapsed().as_secs_f64()
        })
        .collect();
    seconds.sort_by(f64::total_cmp);
    println!(
        "  {what:20} {draws:8} draws {:8.3} s, best {:.3} s, {:.0} ns a draw",
        seconds[RUNS / 2],
        seconds[0],
        seconds[RUNS / 2] / f64::from(draws) * 1e9
    );
    seconds[RUNS / 2]
}

/// What the peer must know of the fastener.
fn fastener(joint: &Joint) -> Value {
    let group = &joint.fasteners[0];
    let Tightening::Torque(torque) = &group.tightening else {
        unreachable!("the joint is tightened by torque");
    };
    let Friction::Coefficients { thread, head } = &torque.friction else {
        unreachable!("friction classes are coefficients");
    };
    let turning = Turning::of(group);
    json!({
        "torque": torque.torque,
        "tolerance": torque.tolerance,
        "running": torque.running,
        "thread": [thread.low, thread.nominal, thread.high],
        "head": [head.low, head.nominal, head.high],
        "pitch": turning.pitch,
        "pitch_diameter": turning.pitch_diameter,
        "friction_radius": turning.friction_radius,
        "bolts": group.places.len(),
    })
}

fn peer(python: &str, chain: &Chain, [ours, alone]: [f64; 2]) {
    let inputs = uncertainty::inputs(chain);
    let plan = chain.draw_plan(0).expect("a plan");
    let mut workspace = plan.workspace();
    let sobol = Sobol::new(inputs.len(), 7);
    let mut walk = sobol.walk(0);
    let mut points = Vec::new();
    let mut found = Vec::new();
    for _ in 0..COMPARED {
        let mut point = vec![0.0; inputs.len()];
        walk.next_into(&mut point);
        let mut at = Realisation::default();
        for (input, u) in inputs.iter().zip(&point) {
            (input.place)(&mut at, *u);
        }
        found.push(plan.drawn(&at, &mut workspace).expect("a draw").all());
        points.push(point);
    }
    let names: Vec<&str> = inputs.iter().map(|input| input.name).collect();
    let job = json!({
        "inputs": names,
        "tables": plan.tables(),
        "fastener": fastener(chain.joint()),
        "points": points,
        "draws": DRAWS,
        "runs": PEER_RUNS,
    });
    let answer = answer::answer(python, "draws.py", &job);
    let mut worst = 0.0_f64;
    for (ours, theirs) in found.iter().zip(answer["found"].as_array().expect("rows")) {
        for (ours, theirs) in ours.iter().zip(theirs.as_array().expect("a row")) {
            worst = worst.max((theirs.as_f64().expect("a number") / ours - 1.0).abs());
        }
    }
    assert!(worst < AGREED, "the peer differs by {worst:e}");
    let seconds = answer::seconds(&answer);
    let theirs = seconds[seconds.len() / 2];
    println!(
        "  NumPy, one core      {DRAWS:8} draws {theirs:8.3} s, best {:.3} s; numbers within {worst:.1e}",
        seconds[0]
    );
    println!(
        "  NumPy over ours: {:.1} on all cores, {:.1} on one",
        theirs / ours,
        theirs / alone
    );
}
