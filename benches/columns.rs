//! How long the elastic contact of bolted plates takes, by case, fineness and number of threads.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

#[path = "columns/cases.rs"]
mod cases;

use std::time::Instant;

use cases::{Plates, case_i, case_ii, posed, sixteen};
use ringsum::pressure::elastic::{Field, Fineness, size, solve};

const RUNS: usize = 3;

fn main() {
    println!(
        "{:9} {:7} {:>8} {:>5} {:>4} {:>8} {:>8} {:>7} {:>9} {:>8}  levels",
        "case", "", "unknowns", "steps", "CG", "1 thread", "2", "MB est.", "gap max", "p max"
    );
    let mut growth = Vec::new();
    for plates in [case_i(), case_ii(), sixteen()] {
        for fineness in [
            Fineness::Coarse,
            Fineness::Fast,
            Fineness::Normal,
            Fineness::Fine,
        ] {
            let one = shown(&plates, fineness);
            if plates.name == "16 bolts" {
                growth.push(one);
            }
        }
    }
    let (first, last) = (growth[0], growth[growth.len() - 1]);
    println!(
        "time grows with unknowns to the power {:.2}",
        (last.1 / first.1).ln() / (last.0 / first.0).ln()
    );
}

/// Unknowns and seconds on one thread.
fn shown(plates: &Plates, fineness: Fineness) -> (f64, f64) {
    posed(plates, fineness, |problem| {
        let best = |threads: usize| -> (f64, Field) {
            let pool = rayon::ThreadPoolBuilder::new()
                .num_threads(threads)
                .build()
                .expect("threads can be started");
            (0..RUNS)
                .map(|_| {
                    let start = Instant::now();
                    let field = pool.install(|| solve(problem)).expect("the case is sound");
                    (start.elapsed().as_secs_f64(), field)
                })
                .min_by(|a, b| a.0.total_cmp(&b.0))
                .expect("there are runs")
        };
        let (one, field) = best(1);
        let (two, other) = best(2);
        assert!(field == other, "threads change the result");
        let health = &field.health;
        println!(
            "{:9} {:7} {:8} {:5} {:4} {:6.2} s {:6.2} s {:7.0} {:6.3} µm {:5.1} MPa  {:?}",
            plates.name,
            format!("{fineness:?}"),
            health.unknowns,
            health.newton_steps,
            health.cg_iterations,
            one,
            two,
            size(problem).expect("the case is sound").bytes as f64 * 1e-6,
            field.gap_max() * 1e6,
            field.peak_pressure() * 1e-6,
            health.levels,
        );
        (health.unknowns as f64, one)
    })
}
