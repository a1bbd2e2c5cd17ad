//! How long the heat through the columns takes, beside the same problem with scikit-fem in one run.
//!
//! `benches/peer/run_columns_heat` makes the Python environment and starts this; without it only our
//! side runs. Case i: two plates of 80 mm × 80 mm × 5 mm with four holes, faces in contact about them,
//! gas between, a footprint of 40 mm × 40 mm on top, a film below.

#![allow(clippy::print_stdout, reason = "a bench shows its times")]

#[path = "peer/answer.rs"]
mod answer;

use std::{sync::Arc, time::Instant};

use ringsum::{
    numerics::columns::{Disc, Fine, Plan, Region, Stop, lines},
    resistance::columns::{
        Body, Conduction, Conductivity, Perfect, Sink, Slab, Source, Stack, Terminals, Zone,
        solve_both,
    },
};
use serde_json::{Value, json};

const RUNS: usize = 9;
const PEER_RUNS: usize = 3;
const HOLE: f64 = 2.75e-3;
const BEARING: f64 = 4.25e-3;
const BOLT: f64 = 0.03;
const HALF: f64 = 0.04;
const SOURCE: f64 = 0.02;
const THICKNESS: f64 = 0.005;
const CONDUCTIVITY: f64 = 167.0;
const FILM: f64 = 2000.0;
/// Contact falls from this, W/(m² K), at the hole to nothing at the edge of the contact.
const CONTACT: f64 = 1.2e6;
const EDGE: f64 = 6.5e-3;
const GAS: f64 = 2500.0;

/// Local conductance at a point from the middle, W/(m² K): the same formula on both sides.
fn local([x, y]: [f64; 2]) -> f64 {
    let r = (x.abs() - BOLT).hypot(y.abs() - BOLT);
    let part = ((r - HOLE) / (EDGE - HOLE)).clamp(0.0, 1.0);
    CONTACT * (1.0 - part * part) + GAS
}

/// Spacing near the bolts over the width of the seat, degree through each plate.
struct Grid {
    name: &'static str,
    fine: f64,
    degree: usize,
}

const GRIDS: [Grid; 3] = [
    Grid {
        name: "fast",
        fine: 0.67,
        degree: 2,
    },
    Grid {
        name: "normal",
        fine: 0.5,
        degree: 3,
    },
    Grid {
        name: "fine",
        fine: 0.33,
        degree: 3,
    },
];

fn stack(grid: &Grid) -> Arc<Stack> {
    let stops = [-HALF, HALF, -BOLT, BOLT].map(|at| Stop {
        at,
        rank: u8::from(at.abs() < HALF),
    });
    let fine = [-BOLT, BOLT].map(|at| Fine {
        at,
        reach: 1.5 * BEARING,
        spacing: grid.fine * (BEARING - HOLE),
    });
    let axis = lines(&stops, &fine, 0.25, 0.7 * BEARING);
    let plan = Plan::new(axis.clone(), axis);
    let holes: Vec<Disc> = [-BOLT, BOLT]
        .iter()
        .flat_map(|x| {
            [-BOLT, BOLT].map(|y| Disc {
                centre: [*x, y],
                radius: HOLE,
            })
        })
        .collect();
    let whole = Region::sample(&plan, &|_| true);
    let shares = whole.without(&Region::discs(&plan, &holes)).shares();
    let plate = Body {
        layers: vec![Slab {
            shares,
            heights: vec![THICKNESS],
            degree: grid.degree,
        }],
    };
    let bodies = vec![plate.clone(), plate];
    Arc::new(Stack::new(plan, bodies).expect("the case fits"))
}

fn median(times: &mut [f64]) -> f64 {
    times.sort_by(f64::total_cmp);
    times[times.len() / 2]
}

fn main() {
    println!("heat of case i, medians of {RUNS} runs (best)");
    println!(
        "  {:7} {:>8} {:>3} {:>18} {:>18} {:>18} {:>10}",
        "", "unknowns", "CG", "set up and solve", "another h", "with perfect", "R, K/W"
    );
    let mut ours = Vec::new();
    for grid in &GRIDS {
        let (resistance, seconds) = shown(grid);
        ours.push((grid.name, resistance, seconds));
    }
    let Ok(python) = std::env::var("RINGSUM_PEER_PYTHON") else {
        println!(
            "  scikit-fem: run benches/peer/run_columns_heat to time the peer in the same run"
        );
        return;
    };
    // Far finer than any of them: the limit that errors are measured from.
    let limit = resistance(&Grid {
        name: "limit",
        fine: 0.16,
        degree: 3,
    });
    // Lines as ours, coarser ones too: quadratic hexahedra may need fewer.
    let grids: Vec<Value> = [1.33, 0.67, 0.5]
        .map(|fine| {
            let grid = Grid {
                name: "",
                fine,
                degree: 2,
            };
            let stack = stack(&grid);
            json!({
                "fine": fine,
                "x": stack.plan().x,
                "shares": stack.bodies()[0].layers[0].shares,
            })
        })
        .to_vec();
    let job = json!({
        "bolt": BOLT, "hole": HOLE, "source": SOURCE, "thickness": THICKNESS,
        "conductivity": CONDUCTIVITY, "film": FILM, "contact": CONTACT, "edge": EDGE, "gas": GAS,
        "runs": PEER_RUNS, "grids": grids,
    });
    let answer = answer::answer(&python, "columns_heat.py", &job);
    println!("  errors are measured from {limit:.6} K/W");
    let mut peer = Vec::new();
    for row in answer["rows"].as_array().expect("rows") {
        let number = |key: &str| row[key].as_f64().expect("a number");
        let times = answer::seconds(row);
        let (off, seconds) = (number("resistance") / limit - 1.0, times[times.len() / 2]);
        println!(
            "  scikit-fem {:32} {:7} unknowns {:9.1} ms  {off:+.2e}",
            row["name"].as_str().expect("a name"),
            number("unknowns"),
            seconds * 1e3,
        );
        peer.push((off.abs(), seconds));
    }
    for (name, resistance, seconds) in &ours {
        let off = resistance / limit - 1.0;
        let equal = peer.iter().filter(|(error, _)| *error <= off.abs());
        let least = equal
            .map(|(_, seconds)| *seconds)
            .fold(f64::INFINITY, f64::min);
        println!(
            "  ringsum {name:7} {:7.1} ms  {off:+.2e}; the fastest peer as good takes {:.1} ms, {:.0} times",
            seconds * 1e3,
            least * 1e3,
            least / seconds
        );
    }
}

/// Source to sink on one grid, K/W.
fn resistance(grid: &Grid) -> f64 {
    let (stack, terminals, local) = case(grid);
    let conductivity = [Conductivity::isotropic(CONDUCTIVITY); 2];
    let mut conduction = Conduction::new(&stack, &terminals, &conductivity).expect("it fits");
    conduction
        .solve(&local)
        .expect("it is solved")
        .source_to_sink
}

/// The stack, its terminals and the local conductances.
fn case(grid: &Grid) -> (Arc<Stack>, Terminals, Vec<Vec<Vec<f64>>>) {
    let stack = stack(grid);
    let terminals = Terminals {
        source: Source::Flux(vec![(
            Zone::Rectangle {
                low: [-SOURCE; 2],
                high: [SOURCE; 2],
            },
            1.0,
        )]),
        sinks: vec![Sink::Film {
            zone: Zone::Face,
            coefficient: FILM,
        }],
        bolts: Vec::new(),
    };
    let plan = stack.plan();
    let values = (0..plan.columns()).map(|column| local(plan.place(column)));
    let values = vec![vec![values.collect()]];
    (stack, terminals, values)
}

/// Resistance, and seconds from the stack to the answer.
fn shown(grid: &Grid) -> (f64, f64) {
    let (stack, terminals, first) = case(grid);
    let conductivity = [Conductivity::isotropic(CONDUCTIVITY); 2];
    let more = first[0][0].iter().map(|h| 1.2 * h).collect();
    let second = vec![vec![more]];
    let (mut whole, mut again, mut both) = (Vec::new(), Vec::new(), Vec::new());
    let mut answer = None;
    for _ in 0..RUNS {
        let start = Instant::now();
        let mut conduction =
            Conduction::new(&stack, &terminals, &conductivity).expect("the case fits");
        let heat = conduction.solve(&first).expect("it is solved");
        whole.push(start.elapsed().as_secs_f64());
        let start = Instant::now();
        conduction.solve(&second).expect("it is solved");
        again.push(start.elapsed().as_secs_f64());
        let start = Instant::now();
        solve_both(&stack, (&terminals, &conductivity), &first).expect("it is solved");
        both.push(start.elapsed().as_secs_f64());
        answer = Some(heat);
    }
    let heat = answer.expect("there are runs");
    let perfect = Perfect::new(&stack, &terminals, &conductivity).expect("it is solved");
    assert!(heat.source_to_sink > perfect.source_to_sink);
    let cell = |times: &mut Vec<f64>| {
        let middle = median(times);
        format!("{:.1} ms ({:.1})", middle * 1e3, times[0] * 1e3)
    };
    let seconds = median(&mut whole.clone());
    println!(
        "  {:7} {:8} {:3} {:>18} {:>18} {:>18} {:10.6}",
        grid.name,
        heat.health.unknowns,
        heat.health.iterations,
        cell(&mut whole),
        cell(&mut again),
        cell(&mut both),
        heat.source_to_sink
    );
    (heat.source_to_sink, seconds)
}
