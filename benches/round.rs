//! The elastic contact of a round pair beside its scikit-fem peer, both in one run.
//!
//! `benches/peer/run_round` makes the Python environment and starts this; without it only our side
//! runs. Both sides look for the contact radius from a first guess to the same tolerance.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

#[path = "peer/answer.rs"]
mod answer;

use std::{hint::black_box, time::Instant};

use ringsum::pressure::round::{Faces, Head, Problem, Solution, solve};
use serde_json::json;

const RUNS: usize = 25;
const PEER_RUNS: usize = 7;
/// Contact radius of the compared case by the project's reference solution, in bearing radii.
const REFERENCE: f64 = 1.44147;
/// Error allowed in it.
const TOLERANCE: f64 = 0.003;
/// Scale of the peer's spacings: the coarsest grids of those tried (2, 1.6, 1.3, 1.15, 1, 0.8, 0.5)
/// fail or wander longer before the edge stays put; this one is the fastest that meets the tolerance.
const PEER_SIZE: f64 = 1.3;

fn main() {
    let equal = Problem {
        hole_radius: 0.625,
        bearing_radius: 1.0,
        rim_radius: 6.0,
        thickness: [1.0, 1.0],
        youngs_modulus: [1.0, 1.0],
        poisson: [0.33, 0.33],
        head: Head::Uniform,
        faces: Faces::Frictionless,
        tolerance: TOLERANCE,
    };
    let unlike = Problem {
        thickness: [0.5, 1.0],
        youngs_modulus: [1.0, 3.0],
        poisson: [0.33, 0.28],
        ..equal
    };
    let rigid = Problem {
        head: Head::Rigid,
        ..equal
    };
    let stuck = Problem {
        faces: Faces::Stuck,
        ..unlike
    };
    println!("contact of a round pair to {TOLERANCE} b, median and best of {RUNS} runs");
    let ours = shown("equal plates", &equal);
    shown("unlike plates", &unlike);
    shown("rigid head", &rigid);
    shown("unlike plates, stuck", &stuck);
    assert!((ours.0 - REFERENCE).abs() < TOLERANCE, "{}", ours.0);
    let Ok(python) = std::env::var("RINGSUM_PEER_PYTHON") else {
        println!("  scikit-fem: run benches/peer/run_round to time the peer in the same run");
        return;
    };
    let job = json!({
        "hole": equal.hole_radius,
        "rim": equal.rim_radius,
        "thickness": equal.thickness[0],
        "poisson": equal.poisson[0],
        "tolerance": TOLERANCE,
        "size": PEER_SIZE,
        "runs": PEER_RUNS,
    });
    let (radius, seconds) = peer(&python, &job);
    println!(
        "  {:22} {:8.2} ms {:8.2} ms   c = {radius:.5} b",
        "equal, scikit-fem",
        seconds[seconds.len() / 2] * 1e3,
        seconds[0] * 1e3
    );
    println!(
        "  scikit-fem over ringsum {:.1} (medians), {:.1} (best)",
        seconds[seconds.len() / 2] / ours.1[RUNS / 2],
        seconds[0] / ours.1[0]
    );
    assert!((radius - REFERENCE).abs() < TOLERANCE, "{radius}");
}

/// Contact radius and sorted seconds of several runs, printed.
fn shown(name: &str, problem: &Problem) -> (f64, Vec<f64>) {
    let solution: Solution = solve(problem).expect("the contact is found");
    let mut seconds: Vec<f64> = (0..RUNS)
        .map(|_| {
            let start = Instant::now();
            black_box(solve(black_box(problem))).expect("the contact is found");
            start.elapsed().as_secs_f64()
        })
        .collect();
    seconds.sort_by(f64::total_cmp);
    println!(
        "  {name:22} {:8.2} ms {:8.2} ms   c = {:.5} b, {} unknowns, {} grids",
        seconds[RUNS / 2] * 1e3,
        seconds[0] * 1e3,
        solution.contact_radius,
        solution.health.unknowns,
        solution.health.remeshes + 1
    );
    (solution.contact_radius, seconds)
}

/// Contact radius and sorted seconds of the peer.
fn peer(python: &str, job: &serde_json::Value) -> (f64, Vec<f64>) {
    let found = answer::answer(python, "round_contact.py", job);
    let radius = found["contact_radius"].as_f64().expect("a number");
    (radius, answer::seconds(&found))
}
