//! The ring sum beside its NumPy peer: 10 000 forces on one joint, both in one run.
//!
//! `benches/peer/run` makes the Python environment and starts this; without it only our side runs.
//! Both sides build the pressure of every ring anew for every force, from radius and cone.

#![allow(
    clippy::print_stdout,
    reason = "a bench tells its times on standard output"
)]

#[path = "peer/answer.rs"]
mod answer;

use std::{hint::black_box, time::Instant};

use rayon::prelude::*;
use ringsum::{
    conductance::{
        Curve, Interface, Local,
        spots::{Asperities, Surfaces},
    },
    estimate::{Chain, Realisation},
    joint::{self, Joint, Law},
    pressure::{Cone, Profile},
};
use serde_json::json;

const EVALUATIONS: usize = 10_000;
const RUNS: usize = 15;

/// Rings of one bolt: radius and area of each.
struct Rings {
    radius: Vec<f64>,
    area: Vec<f64>,
}

fn main() {
    let joint = joint::read(include_str!("../joints/converter_box.toml")).expect("a good joint");
    let chain = Chain::new(&joint).expect("a chain");
    let state = chain.state(0, &Realisation::default()).expect("a state");
    let cone = chain.cones()[0];
    let rings = rings(&chain, &state, &cone);
    let forces: Vec<f64> = (0..EVALUATIONS)
        .map(|index| 1000.0 + 5000.0 * index as f64 / EVALUATIONS as f64)
        .collect();

    let local = &state.conditions.faces[0].local;
    let highest = 1.1 * cone.pressure(rings.radius[0], forces[EVALUATIONS - 1]);
    let curve = Curve::up_to(local, highest).expect("the law of the demo is smooth");
    let sum = |force: f64| ring_sum(&rings, &cone, &curve, force);
    let alone = timed(|| forces.iter().map(|force| sum(*force)).collect());
    let pair = rayon::ThreadPoolBuilder::new()
        .num_threads(2)
        .build()
        .expect("two threads");
    let both = timed(|| pair.install(|| forces.par_iter().map(|force| sum(*force)).collect()));
    println!(
        "{EVALUATIONS} ring sums of {} rings, median of {RUNS} runs",
        rings.radius.len()
    );
    println!("  ringsum, one thread   {:8.2} ms", alone.1 * 1e3);
    println!("  ringsum, two threads  {:8.2} ms", both.1 * 1e3);
    let Ok(python) = std::env::var("RINGSUM_PEER_PYTHON") else {
        println!("  NumPy: run benches/peer/run to time the peer in the same run");
        return;
    };
    let law = law(&joint, local);
    let peer = peer(
        &python,
        &json!({
            "runs": RUNS,
            "forces": forces,
            "rings": { "radius": rings.radius, "area": rings.area, "cone": cone_of(&cone) },
            "law": law,
        }),
    );
    println!("  NumPy, one thread     {:8.2} ms", peer.2 * 1e3);
    println!(
        "  NumPy over ringsum    {:8.2} on one, {:.2} on two threads",
        peer.2 / alone.1,
        peer.2 / both.1
    );
    for (ours, theirs) in [(alone.0[0], peer.0), (alone.0[EVALUATIONS - 1], peer.1)] {
        // The law is read from a table kept within 1e-6 of it.
        assert!(
            (ours / theirs - 1.0).abs() < 1e-6,
            "{ours} W/K against {theirs} W/K"
        );
    }
}

fn ring_sum(rings: &Rings, cone: &Cone, law: &Curve, force: f64) -> f64 {
    let ln_peak = (force * cone.peak_per_force).ln();
    rings
        .radius
        .iter()
        .zip(&rings.area)
        .map(|(radius, area)| area * law.total_of_ln(ln_peak + cone.ln_shape(*radius)))
        .sum()
}

/// The rings in contact of the first bolt, by their middle radius.
fn rings(chain: &Chain, state: &ringsum::estimate::State, cone: &Cone) -> Rings {
    let rows = &chain.rings(0, state)[0];
    let inside = rows
        .iter()
        .filter(|row| row.radius[1] <= cone.contact_radius * (1.0 + 1e-12));
    let (radius, area) = inside
        .map(|row| (0.5 * (row.radius[0] + row.radius[1]), row.area))
        .unzip();
    Rings { radius, area }
}

fn cone_of(cone: &Cone) -> serde_json::Value {
    let Profile::Power { radial, fall } = cone.profile else {
        panic!("the demo uses the fitted shape");
    };
    json!({
        "hole": cone.hole_radius,
        "edge": cone.contact_radius,
        "alpha": radial,
        "beta": fall,
        "peak_per_force": cone.peak_per_force,
    })
}

/// Constants of the elastic-plastic law at fixed hardness, as the peer wants them.
fn law(joint: &Joint, local: &Local) -> serde_json::Value {
    let interface: &Interface = local.interface();
    let surfaces = Surfaces::of(&interface.faces);
    let hardness = interface
        .faces
        .iter()
        .map(|face| match face.hardness {
            ringsum::conductance::Hardness::Meyer(hardness) => hardness,
            ringsum::conductance::Hardness::Micro { .. } => panic!("the demo has fixed hardness"),
        })
        .fold(f64::INFINITY, f64::min);
    assert_eq!(joint.contact.law, Law::ElasticPlastic);
    let mode = Asperities {
        slope: surfaces.slope,
        elastic_modulus: surfaces.elastic_modulus,
        hardness,
    }
    .mode(joint.contact.law);
    let front = surfaces.conductivity * surfaces.slope / surfaces.roughness
        * mode.area_factor.sqrt()
        / (2.0 * (2.0 * std::f64::consts::PI).sqrt());
    json!({
        "f": mode.area_factor,
        "hardness": mode.hardness,
        "front": front,
        "open": local.total(0.0),
    })
}

/// Outcome and median time of several runs, after one to warm up.
fn timed(run: impl Fn() -> Vec<f64>) -> (Vec<f64>, f64) {
    let outcome = black_box(run());
    let mut seconds: Vec<f64> = (0..RUNS)
        .map(|_| {
            let start = Instant::now();
            black_box(run());
            start.elapsed().as_secs_f64()
        })
        .collect();
    seconds.sort_by(f64::total_cmp);
    (outcome, seconds[RUNS / 2])
}

/// First and last sum of the peer, and its median time.
fn peer(python: &str, job: &serde_json::Value) -> (f64, f64, f64) {
    let found = answer::answer(python, "ring_sum.py", job);
    let number = |value: &serde_json::Value| value.as_f64().expect("a number");
    let seconds = answer::seconds(&found);
    (
        number(&found["first"]),
        number(&found["last"]),
        seconds[seconds.len() / 2],
    )
}
