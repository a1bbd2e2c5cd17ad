//! Exact solutions: slabs, walls in series, a smooth field, stretched plates, fins, spreading.

use std::{f64::consts::PI, sync::Arc};

use ringsum::{
    numerics::columns::{Disc, Fine, Plan, Stop, lines},
    resistance::columns::{
        Body, Conduction, Conductivity, Edge, Perfect, Rim, Sink, Slab, Source, Stack, Terminals,
        Zone,
    },
};

use crate::{even, holed, plate, solved, sound};

fn terminals(source: Source, sink: Sink) -> Terminals {
    Terminals {
        source,
        sinks: vec![sink],
        bolts: Vec::new(),
    }
}

fn whole_face() -> Source {
    Source::Flux(vec![(Zone::Face, 1.0)])
}

fn film(coefficient: f64) -> Sink {
    Sink::Film {
        zone: Zone::Face,
        coefficient,
    }
}

/// Two holes in a graded plan.
fn pierced() -> (Plan, Vec<f64>) {
    let graded = |length: f64, parts: usize| {
        let powers = (0..=parts).map(|k| length * (k as f64 / parts as f64).powf(1.4));
        powers.collect::<Vec<f64>>()
    };
    let plan = Plan::new(graded(0.06, 23), graded(0.04, 17));
    let holes = [([0.02, 0.017], 0.003), ([0.045, 0.03], 0.005)];
    let discs = holes.map(|(centre, radius)| Disc { centre, radius });
    let shares = holed(&plan, &discs);
    (plan, shares)
}

fn area(plan: &Plan, shares: &[f64]) -> f64 {
    let cells = shares.iter().enumerate();
    cells
        .map(|(cell, share)| share * plan.cell_area(cell))
        .sum()
}

// Everything is uniform over the plan, so only the residual is left, here 1e-12.
#[test]
fn slabs_with_holes_are_in_series() {
    let (plan, shares) = pierced();
    let area = area(&plan, &shares);
    let bodies = vec![
        plate(&shares, (0.005, 1, 2)),
        plate(&shares, (0.002, 1, 3)),
        plate(&shares, (0.008, 2, 2)),
    ];
    let conductivity = [167.0, 16.0, 390.0].map(Conductivity::isotropic);
    let stack = Stack::new(plan, bodies).expect("it fits");
    let ends = terminals(whole_face(), film(2000.0));
    let mut local = stack.uniform(8000.0);
    local[1] = vec![vec![500.0; local[0][0].len()]];
    let stack = Arc::new(stack);
    let mut conduction = Conduction::new(&stack, &ends, &conductivity).expect("it fits");
    conduction.tolerance = 1e-12;
    let heat = conduction.solve(&local).expect("it is solved");
    let perfect = Perfect::new(&stack, &ends, &conductivity).expect("it is solved");
    sound(&heat, &perfect);
    let through = 0.005 / 167.0 + 0.002 / 16.0 + 0.008 / 390.0;
    let near = |ours: f64, exact: f64| {
        assert!((ours / exact - 1.0).abs() < 1e-12, "{}", ours / exact - 1.0);
    };
    near(
        heat.source_to_sink,
        (through + 1.0 / 8000.0 + 1.0 / 500.0) / area,
    );
    // Perfect contact asks for a residual of 1e-8.
    let off = perfect.source_to_sink * area / through - 1.0;
    assert!(off.abs() < 1e-10, "{off}");
    near(heat.coolant_drop.expect("a film"), 1.0 / (2000.0 * area));
    near(heat.interface_drops[0], 1.0 / (8000.0 * area));
    near(heat.interface_drops[1], 1.0 / (500.0 * area));
    near(heat.contact_per_interface[1], 500.0 * area);
    near(heat.contact, area / (1.0 / 8000.0 + 1.0 / 500.0));
    near(heat.one_dimensional, heat.source_to_sink);
    let means =
        0.5 * 0.005 / 167.0 + 1.0 / 8000.0 + 0.002 / 16.0 + 1.0 / 500.0 + 0.5 * 0.008 / 390.0;
    near(heat.node_to_node, means / area);
    for (flux, weight) in heat.flux[1][0]
        .iter()
        .zip(&heat.stack().faces()[1][0].weights)
    {
        if *weight > 0.0 {
            near(*flux, 1.0 / area);
        }
    }
}

// Series of layers within one body, exact as the slabs are.
#[test]
fn a_wall_of_layers_and_heights_is_exact() {
    let (plan, shares) = pierced();
    let area = area(&plan, &shares);
    let slab = |heights: &[f64], degree: usize| Slab {
        shares: shares.clone(),
        heights: heights.to_vec(),
        degree,
    };
    let body = Body {
        layers: vec![slab(&[0.001, 0.003], 1), slab(&[0.002], 3)],
    };
    let stack = Stack::new(plan, vec![body.clone(), body]).expect("it fits");
    let conductivity = [
        Conductivity::layered(400.0, 3.0),
        Conductivity::layered(0.3, 0.25),
    ];
    let ends = terminals(whole_face(), film(50.0));
    let local = stack.uniform(1e4);
    let stack = Arc::new(stack);
    let mut conduction = Conduction::new(&stack, &ends, &conductivity).expect("it fits");
    conduction.tolerance = 1e-12;
    let heat = conduction.solve(&local).expect("it is solved");
    let exact = (0.006 / 3.0 + 1e-4 + 0.006 / 0.25) / area;
    let off = heat.source_to_sink / exact - 1.0;
    assert!(off.abs() < 1e-12, "{off}");
}

/// One plate under T = cos(πx/L) cosh(πz/L): error of the temperatures, over the largest.
fn smooth(parts: usize) -> f64 {
    let (length, thickness) = (0.1, 0.04);
    let plan = Plan::new(even(0.5 * length, parts), even(0.01, 2));
    let shares = vec![1.0; plan.cells()];
    let k = PI / length;
    let zones = (0..parts)
        .map(|cell| {
            let [low, high] = [plan.x[cell], plan.x[cell + 1]];
            let zone = Zone::Rectangle {
                low: [low, 0.0],
                high: [high, 0.01],
            };
            (zone, (k * high).sin() - (k * low).sin())
        })
        .collect();
    let stack = Stack::new(plan, vec![plate(&shares, (thickness, 3, 3))]).expect("it fits");
    let ends = terminals(Source::Flux(zones), Sink::Rim(Rim::Straight(Edge::East)));
    let (heat, _) = solved(stack, &ends, &[Conductivity::isotropic(167.0)], &[]);
    // One watt over the width of 0.01 m fixes the amplitude.
    let amplitude = 1.0 / (167.0 * 0.01 * (k * thickness).sinh());
    let heights = heat.stack().bodies()[0].heights();
    let mut worst = 0.0_f64;
    for (at, value) in heat.temperatures[0].iter().enumerate() {
        let [x, _] = heat.stack().plan().place(at / heights.len());
        let exact = amplitude * (k * x).cos() * (k * heights[at % heights.len()]).cosh();
        worst = worst.max((value - exact).abs());
    }
    worst / (amplitude * (k * thickness).cosh())
}

// T = cos(πx/L) cosh(πz/L) has no flux through z = 0 and x = 0. Order two in the cells of the plan.
#[test]
fn manufactured_heat_converges() {
    let found = [4, 8, 16, 32].map(smooth);
    for pair in found.windows(2) {
        let order = (pair[0] / pair[1]).log2();
        assert!((1.8..2.3).contains(&order), "{found:?}");
    }
}

// Stretching x by s and k_x by s², with y and z as they were: the stretched problem is the old one
// with all conductances times s. Equal but for the residual.
#[test]
fn a_stretched_plate_with_more_conductivity_is_the_same() {
    let of = |s: f64| {
        let lines_x: Vec<f64> = even(0.06, 24).iter().map(|x| s * x).collect();
        let plan = Plan::new(lines_x, even(0.04, 15));
        let shares = vec![1.0; plan.cells()];
        let bodies = vec![plate(&shares, (0.005, 1, 2)), plate(&shares, (0.004, 1, 3))];
        let stack = Stack::new(plan, bodies).expect("it fits");
        let source = Source::Flux(vec![(
            Zone::Rectangle {
                low: [s * 0.011, 0.007],
                high: [s * 0.033, 0.021],
            },
            1.0,
        )]);
        let conductivity = [167.0, 30.0].map(|k| Conductivity {
            along: [k * s * s, k],
            through: k,
        });
        let mut local = stack.uniform(3000.0);
        for (column, h) in local[0][0].iter_mut().enumerate() {
            let [x, y] = stack.plan().place(column);
            *h *= 1.0 + (x / s / 0.06) * (y / 0.04);
        }
        let ends = terminals(source, film(900.0));
        s * solved(stack, &ends, &conductivity, &local).0.source_to_sink
    };
    let off = of(2.5) / of(1.0) - 1.0;
    assert!(off.abs() < 1e-10, "{off}");
}

// Two thin strips overlap along x; heat enters one end and leaves the other. With strips 1 mm thin
// the drop across them is below 1 % of that along them.
// Two fins that feed each other, derived below.
#[test]
fn a_lap_of_thin_strips_follows_the_fins() {
    let (length, width, thickness, k, h) = (0.08, 0.01, 0.001, 167.0, 600.0);
    let plan = Plan::new(even(length, 80), even(width, 2));
    let shares = vec![1.0; plan.cells()];
    let bodies = vec![
        plate(&shares, (thickness, 1, 2)),
        plate(&shares, (thickness, 1, 2)),
    ];
    let stack = Stack::new(plan, bodies).expect("it fits");
    let ends = terminals(
        Source::Rim(Rim::Straight(Edge::West)),
        Sink::Rim(Rim::Straight(Edge::East)),
    );
    let local = stack.uniform(h);
    let (heat, _) = solved(stack, &ends, &[Conductivity::isotropic(k); 2], &local);
    // k t w T₁″ = h w (T₁ − T₂) = −k t w T₂″. Sum: T₁′ + T₂′ = −Q/(k t w). Difference θ with
    // θ′(0) = θ′ of T₁′ = −Q/(ktw), T₂′ = 0, so −q; at L: T₁′ = 0, T₂′ = −q, so θ′(L) = +q.
    // θ = (q/m) (cosh m(L−x) + cosh mx)/sinh mL; T₁(0) − T₂(L) = qL/2 + (θ(0) + θ(L))/2.
    // Strips of finite thickness add a third of each to the resistance between them.
    let q = 1.0 / (k * thickness * width);
    let between = 1.0 / h + 2.0 * thickness / (3.0 * k);
    let m = (2.0 / (k * thickness * between)).sqrt();
    let theta = q / m * (1.0 + (m * length).cosh()) / (m * length).sinh();
    let exact = 0.5 * q * length + theta;
    let off = heat.source_to_sink / exact - 1.0;
    assert!(off.abs() < 0.01, "{off}");
}

/// A plan about the origin, fine around a circle.
fn about(half: f64, (radius, spacing, widest): (f64, f64, f64)) -> Plan {
    let stops = [-half, half, -radius, radius].map(|at| Stop {
        at,
        rank: u8::from(at.abs() < half),
    });
    let fine = [-radius, radius].map(|at| Fine {
        at,
        reach: 0.25 * radius,
        spacing,
    });
    let own = lines(&stops, &fine, 0.25, widest);
    Plan::new(own.clone(), own)
}

// R = 1/(4 k a), Holm (from memory): an isothermal disc on a half-space. The block's finite depth and
// width take off about a/b of the spreading; the disc in a tube with its other end far
// (Yovanovich, from memory: ψ = 1 − 1.4092 ε + 0.2959 ε³ + …, R_s = ψ/(4 k a)) tells how much.
#[test]
fn an_isothermal_disc_spreads_as_in_the_handbook() {
    let (a, b, k, depth) = (0.004, 0.04, 20.0, 0.08);
    let plan = about(b, (a, 0.00025, 0.008));
    // The tube: a round block of radius b.
    let tube = Disc {
        centre: [0.0; 2],
        radius: b,
    };
    let shares = ringsum::numerics::columns::Region::discs(&plan, &[tube]).shares();
    let heights: Vec<f64> = {
        // Finest at the top, where the disc is.
        let mut heights: Vec<f64> = (0..12).map(|n| 0.0005 * 1.5_f64.powi(n)).collect();
        let sum: f64 = heights.iter().sum();
        for height in &mut heights {
            *height *= depth / sum;
        }
        heights.reverse();
        heights
    };
    let body = Body {
        layers: vec![Slab {
            shares,
            heights,
            degree: 2,
        }],
    };
    let stack = Stack::new(plan, vec![body]).expect("it fits");
    let disc = Zone::Disc {
        centre: [0.0; 2],
        radius: a,
    };
    let ends = terminals(Source::Isothermal(vec![disc]), Sink::Held(Zone::Face));
    let (heat, _) = solved(stack, &ends, &[Conductivity::isotropic(k)], &[]);
    let ratio = a / b;
    let spreading = (1.0 - 1.4092 * ratio + 0.2959 * ratio.powi(3)) / (4.0 * k * a);
    let exact = depth / (k * PI * b * b) + spreading;
    let off = heat.source_to_sink / exact - 1.0;
    assert!(off.abs() < 0.01, "{off}");
}

// ln(R/a)/(2π k t) is exact between two circles of a thin disc; the source is a hole's wall made
// small: uniform flux over a disc of radius a has a mean of 1/(8π k t) more (parabola inside).
#[test]
fn a_held_round_rim_stands_where_it_is_drawn() {
    let (a, rim, k, thickness) = (0.01, 0.05, 100.0, 0.0005);
    for widest in [0.004, 0.002] {
        let plan = about(1.08 * rim, (a, 0.001, widest));
        let round = Disc {
            centre: [0.0; 2],
            radius: rim,
        };
        let shares = ringsum::numerics::columns::Region::discs(&plan, &[round]).shares();
        let stack = Stack::new(plan, vec![plate(&shares, (thickness, 1, 2))]).expect("it fits");
        let source = Source::Flux(vec![(
            Zone::Disc {
                centre: [0.0; 2],
                radius: a,
            },
            1.0,
        )]);
        let sink = Sink::Rim(Rim::Round {
            centre: [0.0; 2],
            radius: rim,
        });
        let (heat, _) = solved(
            stack,
            &terminals(source, sink),
            &[Conductivity::isotropic(k)],
            &[],
        );
        let exact = ((rim / a).ln() / (2.0 * PI) + 1.0 / (8.0 * PI)) / (k * thickness);
        let off = heat.source_to_sink / exact - 1.0;
        assert!(off.abs() < 0.01, "{off}");
    }
}
