//! The elastic contact of a round pair and the heat through it beside their scikit-fem peers.
//!
//! `benches/peer/run_round` makes the Python environment and starts this; without it only our side
//! runs. Both sides look for the contact radius from a first guess to the same tolerance, and for
//! the heat on grids that leave the same error in the resistance.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

#[path = "peer/answer.rs"]
mod answer;

use std::{hint::black_box, time::Instant};

use ringsum::{
    pressure::round::{FaceFriction, HeadModel, Problem, Solution, solve},
    resistance::round as heat,
};
use serde_json::json;

const RUNS: usize = 25;
const PEER_RUNS: usize = 7;
/// Contact radius of the compared case by the project's reference solution, in bearing radii.
const REFERENCE: f64 = 1.44147;
/// Error allowed in it.
const TOLERANCE: f64 = 0.003;
/// Source to sink of the compared heat problem by the project's reference solution.
const HEAT_REFERENCE: f64 = 0.297972;
/// Conductance at the mean head pressure, over conductivity and bearing radius.
const BIOT: f64 = 10.0;
/// Error allowed in it.
const HEAT_ERROR: f64 = 2e-4;
/// Scale of the peer's spacings for the heat: of 0.2 to 1.3 the coarsest, as all meet the error.
const PEER_HEAT_SIZE: f64 = 1.3;
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
        head: HeadModel::Uniform,
        faces: FaceFriction::Frictionless,
        tolerance: TOLERANCE,
    };
    let unlike = Problem {
        thickness: [0.5, 1.0],
        youngs_modulus: [1.0, 3.0],
        poisson: [0.33, 0.28],
        ..equal
    };
    let rigid = Problem {
        head: HeadModel::Rigid,
        ..equal
    };
    let stuck = Problem {
        faces: FaceFriction::Stuck,
        ..unlike
    };
    println!("contact of a round pair to {TOLERANCE} b, median and best of {RUNS} runs");
    let ours = shown("equal plates", &equal);
    shown("unlike plates", &unlike);
    shown("rigid head", &rigid);
    shown("unlike plates, stuck", &stuck);
    assert!((ours.0 - REFERENCE).abs() < TOLERANCE, "{}", ours.0);
    let field = solve(&equal).expect("the contact is found");
    let python = std::env::var("RINGSUM_PEER_PYTHON").ok();
    if let Some(python) = &python {
        contact_peer(python, &equal, &ours);
    } else {
        println!("  scikit-fem: run benches/peer/run_round to time the peer in the same run");
    }
    heat_rows(&field, python.as_deref());
}

/// The peer of the contact of equal plates.
fn contact_peer(python: &str, equal: &Problem, ours: &(f64, Vec<f64>)) {
    let job = json!({
        "hole": equal.hole_radius,
        "rim": equal.rim_radius,
        "thickness": equal.thickness[0],
        "poisson": equal.poisson[0],
        "tolerance": TOLERANCE,
        "size": PEER_SIZE,
        "runs": PEER_RUNS,
    });
    let (radius, seconds) = peer(python, &job);
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

/// Heat through the compared pair, face to face in vacuum.
fn heat_rows(field: &Solution, python: Option<&str>) {
    let disc = heat::Disc {
        hole_radius: 0.625,
        rim_radius: 6.0,
        thickness: 1.0,
        conductivity: [1.0; 2],
    };
    let problem = heat::Problem {
        plates: [disc; 2],
        bearing_radius: 1.0,
        contact_radius: field.contact_radius,
        inlet: heat::Inlet::Isothermal(heat::Patch::Face),
        outlet: heat::Outlet::IsothermalBack,
        shank: 0.0,
    };
    let force = std::f64::consts::PI * (1.0 - 0.625 * 0.625);
    let local = |radius: f64| BIOT * field.pressure(radius, force).powf(0.95);
    println!("heat through the same pair, median and best of {RUNS} runs");
    let condense = timed(|| {
        black_box(heat::condense(black_box(&problem))).expect("the plates condense");
    });
    row("plates condensed", &condense);
    let plates = heat::condense(&problem).expect("the plates condense");
    let again = timed(|| {
        black_box(plates.solve(black_box(local))).expect("the heat is found");
    });
    row("another conductance", &again);
    let found = plates.solve(local).expect("the heat is found");
    let ours = found.path.source_to_sink;
    println!(
        "  R = {ours:.6}, {} unknowns, {:+.1e} to a coarser grid",
        found.health.unknowns, found.health.coarser_grid
    );
    assert!((ours / HEAT_REFERENCE - 1.0).abs() < HEAT_ERROR, "{ours}");
    let Some(python) = python else { return };
    let pressure: Vec<f64> = field
        .pressure_per_force
        .iter()
        .map(|value| value * force)
        .collect();
    let job = json!({
        "hole": disc.hole_radius,
        "rim": disc.rim_radius,
        "thickness": disc.thickness,
        "edge": field.contact_radius,
        "radii": field.radii,
        "pressure": pressure,
        "biot": BIOT,
        "size": PEER_HEAT_SIZE,
        "runs": PEER_RUNS,
    });
    let answered = answer::answer(python, "round_heat.py", &job);
    let theirs = answered["resistance"].as_f64().expect("a number");
    let seconds = answer::seconds(&answered);
    row("scikit-fem, one solve", &seconds);
    println!("  R = {theirs:.6}");
    let whole = condense[RUNS / 2] + again[RUNS / 2];
    println!(
        "  scikit-fem over ringsum {:.1} (first solve), {:.0} (another conductance)",
        seconds[seconds.len() / 2] / whole,
        seconds[seconds.len() / 2] / again[RUNS / 2]
    );
    assert!(
        (theirs / HEAT_REFERENCE - 1.0).abs() < HEAT_ERROR,
        "{theirs}"
    );
}

/// Sorted seconds of several runs.
fn timed(mut work: impl FnMut()) -> Vec<f64> {
    let mut seconds: Vec<f64> = (0..RUNS)
        .map(|_| {
            let start = Instant::now();
            work();
            start.elapsed().as_secs_f64()
        })
        .collect();
    seconds.sort_by(f64::total_cmp);
    seconds
}

fn row(name: &str, seconds: &[f64]) {
    println!(
        "  {name:22} {:8.2} ms {:8.2} ms",
        seconds[seconds.len() / 2] * 1e3,
        seconds[0] * 1e3
    );
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
