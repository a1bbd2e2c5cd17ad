//! How long the elastic contact of bolted plates takes, by case, fineness and number of threads.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

#[path = "../tests/validation_columns/joints.rs"]
#[allow(dead_code, reason = "tests use what a bench does not")]
mod joints;

use std::time::Instant;

use joints::{Plates, case_i, case_ii, crossings};
use ringsum::pressure::elastic::{Field, Fineness, size, solve};

const RUNS: usize = 3;

/// Name and plates of a case.
type Case = (&'static str, fn(Fineness) -> Plates);

/// Sixteen M4 around 150 × 100 × 5 + 8 mm, bowed.
fn sixteen(fineness: Fineness) -> Plates {
    let mut at = crossings(&[0.008, 0.0415, 0.075, 0.1085, 0.142], &[0.008, 0.092]);
    at.extend(crossings(&[0.008, 0.142], &[0.029, 0.05, 0.071]));
    Plates {
        hole: 0.00225,
        bearing: 0.0035,
        forces: vec![3000.0; at.len()],
        bow: 30e-6,
        fineness,
        ..Plates::pair([0.15, 0.1], [0.005, 0.008], at)
    }
}

fn main() {
    // A case by name alone, for a profile or its memory: `case_i`, `case_ii`, `sixteen`,
    // `growth`; a fineness; `once`.
    let only: Vec<String> = std::env::args()
        .skip(1)
        .filter(|word| !word.starts_with('-'))
        .collect();
    if only.iter().any(|word| word == "once") {
        return once(&only);
    }
    println!(
        "{:8} {:7} {:>8} {:>5} {:>4} {:>8} {:>8} {:>7} {:>9} {:>8}  levels",
        "case", "", "unknowns", "steps", "CG", "1 thread", "2", "MB est.", "gap max", "p max"
    );
    let cases: [Case; 3] = [
        ("case_i", case_i),
        ("case_ii", case_ii),
        ("sixteen", sixteen),
    ];
    for (name, plates) in cases {
        for fineness in [
            Fineness::Coarse,
            Fineness::Fast,
            Fineness::Normal,
            Fineness::Fine,
        ] {
            let words = [name.to_string(), format!("{fineness:?}")];
            if only.iter().all(|word| words.contains(word)) {
                shown(&words, &plates(fineness));
            }
        }
    }
    if only.is_empty() || only.iter().any(|word| word == "growth") {
        growth();
    }
}

/// More and more bolts of one pitch on larger and larger plates, all alike, one thread: time and
/// memory against unknowns.
fn growth() {
    println!(
        "{:>8} {:>5} {:>4} {:>8} {:>9}",
        "unknowns", "steps", "CG", "seconds", "peak MB"
    );
    let pool = rayon::ThreadPoolBuilder::new()
        .num_threads(1)
        .build()
        .expect("a thread can be started");
    let mut times = Vec::new();
    for bolts in [2, 3, 4, 6, 8] {
        let lines: Vec<f64> = (0..bolts).map(|k| 0.01 + 0.03 * f64::from(k)).collect();
        let side = 0.02 + 0.03 * f64::from(bolts - 1);
        let plates = Plates {
            fineness: Fineness::Normal,
            ..Plates::pair([side; 2], [0.005; 2], crossings(&lines, &lines))
        };
        let (seconds, field) = (0..RUNS)
            .map(|_| {
                let start = Instant::now();
                let field = pool.install(|| plates.field());
                (start.elapsed().as_secs_f64(), field)
            })
            .min_by(|a, b| a.0.total_cmp(&b.0))
            .expect("there are runs");
        let health = &field.health;
        println!(
            "{:8} {:5} {:4} {:8.2} {:>9}",
            health.unknowns,
            health.newton_steps,
            health.cg_iterations,
            seconds,
            peak_megabytes().map_or_else(|| "?".into(), |peak| format!("{peak:.0}")),
        );
        times.push(((health.unknowns as f64).ln(), seconds.ln()));
    }
    let (first, last) = (times[0], times[times.len() - 1]);
    let power = (last.1 - first.1) / (last.0 - first.0);
    println!("time grows with unknowns to the power {power:.2}");
}

/// Most memory this process has held, where the system tells.
fn peak_megabytes() -> Option<f64> {
    let status = std::fs::read_to_string("/proc/self/status").ok()?;
    let line = status.lines().find(|line| line.starts_with("VmHWM"))?;
    let kilobytes: f64 = line.split_whitespace().nth(1)?.parse().ok()?;
    Some(kilobytes * 1e-3)
}

/// One solution, for a profile or for the memory of the process.
fn once(words: &[String]) {
    let fineness = match words
        .iter()
        .find(|word| word.starts_with(char::is_uppercase))
    {
        Some(word) if word == "Fine" => Fineness::Fine,
        Some(word) if word == "Normal" => Fineness::Normal,
        _ => Fineness::Fast,
    };
    let plates = match words.iter().find(|word| word.contains('_')) {
        Some(word) if word == "case_i" => case_i(fineness),
        Some(_) => case_ii(fineness),
        None => sixteen(fineness),
    };
    let start = Instant::now();
    let field = plates.field();
    println!(
        "{} unknowns, {:.2} s",
        field.health.unknowns,
        start.elapsed().as_secs_f64()
    );
}

/// Times on one thread and on two.
fn shown(words: &[String; 2], plates: &Plates) {
    plates.posed(|problem| {
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
            "{:8} {:7} {:8} {:5} {:4} {:6.2} s {:6.2} s {:7.0} {:6.3} µm {:5.1} MPa  {:?}",
            words[0],
            words[1],
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
    });
}
