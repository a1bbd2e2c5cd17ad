//! A search of layouts: the screening, the elastic field for the best, and how their ranks agree.
//!
//! `cargo bench --bench arrange` times 1000 screened and 20 solved layouts; `-- ranks 200` solves so
//! many random ones and compares; `RAYON_NUM_THREADS` sets the threads.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

use std::time::Instant;

use rayon::prelude::*;
use ringsum::{
    estimate::{Choice, Fineness},
    joint::{self, Arrange},
    layout::{Constraints, Goal, Measure, Search, Size, Task, solved},
};

#[path = "../tests/shared/layouts.rs"]
mod layouts;
use layouts::{random_layouts, spearman};

const TEXT: &str = include_str!("../joints/service_lid.toml");
const FAST: Choice = Choice::elastic(Fineness::Fast, 1_000_000_000);
const SIDES: [f64; 2] = [0.1, 0.06];

type Layouts = Vec<(usize, Vec<[f64; 2]>)>;

/// Processor seconds of this process in user mode, from the kernel's own account; nothing elsewhere.
fn processor_seconds() -> f64 {
    let stat = std::fs::read_to_string("/proc/self/stat").unwrap_or_default();
    let fields = stat.rsplit(')').next().unwrap_or("");
    let ticks = fields
        .split_whitespace()
        .nth(11)
        .and_then(|ticks| ticks.parse::<f64>().ok());
    // A hundred ticks to the second on every common kernel.
    ticks.map_or(f64::NAN, |ticks| ticks / 100.0)
}

fn timed<T>(what: &str, work: impl FnOnce() -> T) -> T {
    let (wall, processor) = (Instant::now(), processor_seconds());
    let done = work();
    println!(
        "{what}: {:.2} s, {:.2} s of processor",
        wall.elapsed().as_secs_f64(),
        processor_seconds() - processor
    );
    done
}

fn main() {
    let words: Vec<String> = std::env::args().collect();
    let joint = joint::read(TEXT).expect("the demo joint is good");
    let sizes = [Size::new(None, joint).expect("nothing is cold")];
    let arrange = Arrange {
        keep_out: Vec::new(),
        sizes: 0,
        ..Arrange::default()
    };
    let task = Task {
        goal: Goal::Resistance,
        solve: 20,
        seed: 1,
        choice: FAST,
    };
    let constraints = Constraints::new(&sizes[0], &arrange);
    let layouts: Layouts = random_layouts(&constraints, SIDES, 1000)
        .into_iter()
        .map(|places| (0, places))
        .collect();
    let search = Search::new(task, &arrange, &sizes).expect("there is room");
    let screened = timed("1000 layouts of free places screened", || {
        search.screened(&layouts)
    });
    let count = words
        .iter()
        .position(|word| word == "ranks")
        .and_then(|at| words.get(at + 1)?.parse::<usize>().ok())
        .unwrap_or(20);
    let nominal: Vec<f64> = timed(&format!("{count} solved at three forces"), || {
        layouts[..count]
            .par_iter()
            .map(|(size, places)| {
                let mut joint = sizes[*size].joint.clone();
                joint.fasteners[0].places.clone_from(places);
                let found = solved(&joint, FAST, Measure::SourceToSink);
                found.expect("the field is there").cases[0].nominal
            })
            .collect()
    });
    let mut errors: Vec<f64> = screened
        .iter()
        .zip(&nominal)
        .map(|(a, b)| a / b - 1.0)
        .collect();
    errors.sort_by(f64::total_cmp);
    println!(
        "ranks of {count}: Spearman {:.4}; screened over solved {:+.1} % to {:+.1} %, median {:+.1} %",
        spearman(&screened[..count], &nominal),
        100.0 * errors[0],
        100.0 * errors[errors.len() - 1],
        100.0 * errors[errors.len() / 2],
    );
}
