//! What holds for every solution: bounds, limits, symmetry, threads, refusals.

use std::sync::Arc;

use ringsum::{
    numerics::columns::{Disc, Plan},
    resistance::{
        Failure,
        columns::{
            Across, Body, Bolt, Conduction, Conductivity, Edge, Meeting, Perfect, Placed, Rim,
            Seat, Side, Sink, Slab, Source, Stack, Terminals, Zone, solve_both,
        },
    },
};

use crate::{
    even, holed,
    layout::{Case, Grid},
    plate, solved, sound,
};

const HOLES: [[f64; 2]; 2] = [[0.012, 0.02], [0.048, 0.02]];

/// Two plates with two bolts, the source off the middle.
fn joint() -> (Stack, Terminals) {
    let plan = Plan::new(even(0.06, 40), even(0.04, 26));
    let shares = holed(
        &plan,
        &HOLES.map(|centre| Disc {
            centre,
            radius: 0.0028,
        }),
    );
    let bodies = vec![plate(&shares, (0.005, 1, 2)), plate(&shares, (0.004, 1, 2))];
    let stack = Stack::new(plan, bodies).expect("it fits");
    let terminals = Terminals {
        source: Source::Flux(vec![(
            Zone::Rectangle {
                low: [0.005, 0.004],
                high: [0.031, 0.022],
            },
            1.0,
        )]),
        sinks: vec![Sink::Film {
            zone: Zone::Face,
            coefficient: 2000.0,
        }],
        bolts: HOLES
            .map(|at| Bolt {
                at,
                head: [0.0028, 0.0043],
                seat: Seat::Nut {
                    annulus: [0.0028, 0.0043],
                },
                strength: 0.0,
            })
            .to_vec(),
    };
    (stack, terminals)
}

const METALS: [Conductivity; 2] = [
    Conductivity {
        along: [167.0; 2],
        through: 167.0,
    },
    Conductivity {
        along: [120.0; 2],
        through: 120.0,
    },
];

/// Contact about the bolts over an open rest, W/(m² K).
fn about_bolts(stack: &Stack, [touching, open]: [f64; 2]) -> Vec<Vec<Vec<f64>>> {
    let plan = stack.plan();
    let local = (0..plan.columns()).map(|column| {
        let [x, y] = plan.place(column);
        let near = HOLES.iter().any(|at| (x - at[0]).hypot(y - at[1]) < 0.0065);
        if near { touching } else { open }
    });
    vec![vec![local.collect()]]
}

#[test]
fn resistance_keeps_above_its_bounds() {
    for [touching, open] in [[1e5, 0.0], [1e5, 3e3], [30.0, 30.0], [1e7, 1e7]] {
        for strength in [0.0, 0.02, 3.0] {
            let (stack, mut terminals) = joint();
            for bolt in &mut terminals.bolts {
                bolt.strength = strength;
            }
            let local = about_bolts(&stack, [touching, open]);
            let (heat, perfect) = solved(stack, &terminals, &METALS, &local);
            let path = heat.path(&perfect);
            assert!(path.added_by_joint > 0.0);
            assert_eq!(path.checked("columns"), Ok(()));
            let per_bolt: f64 = path.contact_per_bolt.iter().sum();
            assert!((per_bolt / path.contact - 1.0).abs() < 1e-12);
            assert!(heat.hottest.rise >= heat.source_to_sink);
        }
    }
}

// 1e9 W/(m² K) over 24 cm² is 4e-7 K/W beside 0.05 K/W.
#[test]
fn perfect_contact_is_the_limit_of_good_contact() {
    let (stack, terminals) = joint();
    let local = stack.uniform(1e9);
    let (heat, perfect) = solved(stack, &terminals, &METALS, &local);
    let off = heat.source_to_sink / perfect.source_to_sink - 1.0;
    assert!((0.0..1e-4).contains(&off), "{off}");
}

#[test]
fn perfect_contact_serves_its_own_conductivities() {
    let (stack, mut terminals) = joint();
    let perfect = Perfect::new(&stack, &terminals, &METALS).expect("it is solved");
    assert!(perfect.serves(&terminals, &METALS));
    assert!(!perfect.serves(&terminals, &[METALS[0]; 2]));
    terminals.bolts[0].strength = 0.1;
    assert!(!perfect.serves(&terminals, &METALS));
}

// From the residual of 1e-8; readings are quadratic in it.
#[test]
fn another_conductance_from_the_last_temperatures_is_the_same_as_anew() {
    let (stack, terminals) = joint();
    let stack = Arc::new(stack);
    let (first, second) = (
        about_bolts(&stack, [1e5, 0.0]),
        about_bolts(&stack, [4e4, 900.0]),
    );
    let mut kept = Conduction::new(&stack, &terminals, &METALS).expect("it fits");
    kept.solve(&first).expect("it is solved");
    let again = kept.solve(&second).expect("it is solved");
    let mut fresh = Conduction::new(&stack, &terminals, &METALS).expect("it fits");
    let anew = fresh.solve(&second).expect("it is solved");
    assert!((again.source_to_sink / anew.source_to_sink - 1.0).abs() < 1e-9);
    assert!((again.hottest.rise / anew.hottest.rise - 1.0).abs() < 1e-6);
}

#[test]
fn terminals_on_their_columns_serve_other_bolts_and_no_other_zones() {
    let (stack, mut terminals) = joint();
    let stack = Arc::new(stack);
    let local = about_bolts(&stack, [1e5, 30.0]);
    let placed = Placed::new(&stack, &terminals).expect("it fits");
    for bolt in &mut terminals.bolts {
        bolt.strength += 0.05;
    }
    let stronger = placed.under(&terminals).expect("zones are the same");
    let mut kept = Conduction::placed(&stronger, &METALS).expect("it fits");
    let mut anew = Conduction::new(&stack, &terminals, &METALS).expect("it fits");
    let solved = |conduction: &mut Conduction| conduction.solve(&local).expect("it is solved");
    // The same equations from the same start.
    let [one, other] = [solved(&mut kept), solved(&mut anew)];
    assert_eq!(one.source_to_sink.to_bits(), other.source_to_sink.to_bits());
    let perfect = [
        Perfect::placed(&stronger, &METALS).expect("it is solved"),
        Perfect::new(&stack, &terminals, &METALS).expect("it is solved"),
    ];
    assert_eq!(perfect[0], perfect[1]);
    terminals.sinks = vec![Sink::Rim(Rim::Straight(Edge::North))];
    assert!(placed.under(&terminals).is_none());
}

// A bolt alone: heat converges to its head and leaves it below; more strength helps, and the
// bound of strength in series with nothing else holds.
#[test]
fn bolts_alone_carry_the_heat() {
    let (stack, mut terminals) = joint();
    let vacuum = stack.uniform(0.0);
    let stack = Arc::new(stack);
    let of = |terminals: &Terminals| {
        let (_, heat, perfect) =
            solve_both(&stack, (terminals, &METALS), &vacuum).expect("it is solved");
        sound(&heat, &perfect);
        heat
    };
    for bolt in &mut terminals.bolts {
        bolt.strength = 0.02;
    }
    let nut = of(&terminals);
    assert!(
        nut.source_to_sink > 25.0 && nut.source_to_sink < 30.0,
        "{}",
        nut.source_to_sink
    );
    for bolt in &mut terminals.bolts {
        bolt.seat = Seat::Thread {
            annulus: [0.0028, 0.0036],
            depth: 0.003,
        };
    }
    let thread = of(&terminals);
    assert!((thread.source_to_sink / nut.source_to_sink - 1.0).abs() < 0.01);
    assert!((thread.source_to_sink / nut.source_to_sink - 1.0).abs() > 1e-5);
}

#[test]
fn faces_apart_in_vacuum_block_the_heat() {
    let (stack, terminals) = joint();
    let vacuum = stack.uniform(0.0);
    let stack = Arc::new(stack);
    let (_, heat, perfect) =
        solve_both(&stack, (&terminals, &METALS), &vacuum).expect("no failure");
    let path = heat.path(&perfect);
    assert!(path.source_to_sink.is_infinite() && perfect.source_to_sink.is_finite());
    assert_eq!(path.checked("columns"), Ok(()));
    assert!(heat.face(0, Side::Up).iter().all(|rise| rise.is_infinite()));
    assert!(heat.face(1, Side::Down).iter().all(|rise| *rise == 0.0));
}

/// The joint seen otherwise: `turn` places every point of the plan anew.
fn seen(turn: fn([f64; 2]) -> [f64; 2], size: [f64; 2]) -> f64 {
    let cells = if size[0] > size[1] {
        [40, 26]
    } else {
        [26, 40]
    };
    let plan = Plan::new(even(size[0], cells[0]), even(size[1], cells[1]));
    let shares = holed(
        &plan,
        &HOLES.map(|centre| Disc {
            centre: turn(centre),
            radius: 0.0028,
        }),
    );
    let bodies = vec![plate(&shares, (0.005, 1, 2)), plate(&shares, (0.004, 1, 3))];
    let stack = Stack::new(plan, bodies).expect("it fits");
    let (a, b) = (turn([0.005, 0.004]), turn([0.031, 0.022]));
    let low = [0, 1].map(|axis| f64::min(a[axis], b[axis]));
    let high = [0, 1].map(|axis| f64::max(a[axis], b[axis]));
    let terminals = Terminals {
        source: Source::Flux(vec![(Zone::Rectangle { low, high }, 1.0)]),
        sinks: vec![Sink::Held(Zone::Disc {
            centre: turn([0.04, 0.025]),
            radius: 0.011,
        })],
        bolts: vec![Bolt {
            at: turn(HOLES[0]),
            head: [0.0028, 0.0043],
            seat: Seat::Nut {
                annulus: [0.0028, 0.0043],
            },
            strength: 0.5,
        }],
    };
    let local = (0..stack.plan().columns()).map(|column| {
        let at = stack.plan().place(column);
        let near = HOLES
            .map(turn)
            .iter()
            .any(|hole| (at[0] - hole[0]).hypot(at[1] - hole[1]) < 0.0065);
        if near { 1e5 } else { 400.0 }
    });
    let local = vec![vec![local.collect()]];
    solved(stack, &terminals, &METALS, &local).0.source_to_sink
}

// Sums in another order and the residual, nothing else.
#[test]
fn mirrored_and_turned_joints_are_the_same() {
    let [width, height] = [0.06, 0.04];
    let known = seen(|at| at, [width, height]);
    let mirrored = seen(|[x, y]| [0.06 - x, y], [width, height]);
    let turned = seen(|[x, y]| [0.04 - y, x], [height, width]);
    assert!((mirrored / known - 1.0).abs() < 1e-9, "{mirrored} {known}");
    assert!((turned / known - 1.0).abs() < 1e-9, "{turned} {known}");
}

#[test]
fn threads_do_not_change_a_bit() {
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(threads)
            .build()
            .expect("a pool");
        pool.install(|| {
            let (stack, terminals) = joint();
            let local = about_bolts(&stack, [1e5, 900.0]);
            let (heat, perfect) = solved(stack, &terminals, &METALS, &local);
            (heat.temperatures, perfect.source_to_sink)
        })
    };
    assert!(on(1) == on(2));
}

// Feet of 1 mm under a third of the plate, ribs on another; beside the feet heat crosses the gap.
#[test]
fn feet_and_ribs_conduct_where_they_are() {
    let plan = Plan::new(even(0.06, 30), even(0.02, 10));
    let part = |inside: &dyn Fn(f64) -> bool| -> Vec<f64> {
        (0..plan.cells())
            .map(|cell| {
                let [x, _] = plan.cell_sides(cell);
                f64::from(u8::from(inside(0.5 * (x[0] + x[1]))))
            })
            .collect()
    };
    let whole = part(&|_| true);
    let feet = part(&|x| x < 0.02);
    let ribs = part(&|x| x > 0.04);
    let slab = |shares: &[f64], height: f64| Slab {
        shares: shares.to_vec(),
        heights: vec![height],
        degree: 2,
    };
    let upper = Body {
        layers: vec![slab(&feet, 0.001), slab(&whole, 0.003), slab(&ribs, 0.005)],
    };
    let lower = plate(&whole, (0.004, 1, 2));
    let stack = Stack::new(plan.clone(), vec![upper, lower]).expect("it fits");
    // The touching part is the feet; beside it the plate's face above the gap.
    let quarter = |shares: Vec<f64>| {
        let mut weights = vec![0.0; plan.columns()];
        for (cell, share) in shares.iter().enumerate() {
            for column in plan.corners(cell) {
                weights[column] += 0.25 * share * plan.cell_area(cell);
            }
        }
        weights
    };
    let touching = stack.faces()[0][0].clone();
    let open = Meeting {
        upper: 2,
        lower: 2,
        weights: quarter(part(&|x| x > 0.02)),
    };
    let stack = stack.meeting(0, vec![touching, open]).expect("it fits");
    let terminals = Terminals {
        source: Source::Flux(vec![(Zone::Face, 1.0)]),
        sinks: vec![Sink::Film {
            zone: Zone::Face,
            coefficient: 500.0,
        }],
        bolts: Vec::new(),
    };
    // Nearly isothermal bodies: two conductances side by side.
    let conductivity = [Conductivity::isotropic(1e6); 2];
    let columns = stack.plan().columns();
    let local = vec![vec![vec![800.0; columns], vec![50.0; columns]]];
    let (heat, _) = solved(stack, &terminals, &conductivity, &local);
    let exact = 1.0 / (800.0 * 4e-4 + 50.0 * 8e-4);
    let off = heat.source_to_sink / exact - 1.0;
    assert!(off.abs() < 1e-3, "{off}");
    // All of the outer face is heated, ribs and what lies between them.
    assert!((heat.contact - (800.0 * 4e-4 + 50.0 * 8e-4)).abs() < 1e-9);
    let sections = heat.section(Across::X(0.01)).expect("it crosses");
    assert_eq!(sections[0].heights.len(), 7);
    // Above the plate between the ribs there is nothing to tell.
    assert!(sections[0].rise[2][6].is_none() && sections[0].rise[28][6].is_some());
    assert!((sections[0].heights[0] - 0.004).abs() < 1e-15);
}

#[test]
fn zones_share_the_heat() {
    let (stack, mut terminals) = joint();
    let zone = |low: [f64; 2], high: [f64; 2]| Zone::Rectangle { low, high };
    let one = zone([0.005, 0.004], [0.02, 0.015]);
    let other = zone([0.035, 0.02], [0.055, 0.035]);
    let local = about_bolts(&stack, [1e5, 900.0]);
    let mut of = |zones: Vec<(Zone, f64)>| {
        terminals.source = Source::Flux(zones);
        solved(stack.clone(), &terminals, &METALS, &local).0
    };
    let both = of(vec![(one.clone(), 3.0), (other.clone(), 1.0)]);
    let first = of(vec![(one, 1.0)]);
    let second = of(vec![(other, 1.0)]);
    // The field is linear in the heat of each zone, up to the residual.
    let faces = [&both, &first, &second].map(|heat| heat.face(0, Side::Up));
    for ((both, first), second) in faces[0].iter().zip(&faces[1]).zip(&faces[2]) {
        assert!((both - 0.75 * first - 0.25 * second).abs() < 1e-6);
    }
    let mean = 0.75 * both.zones[0] + 0.25 * both.zones[1];
    assert!((both.source_to_sink / mean - 1.0).abs() < 1e-12);
}

#[test]
fn what_does_not_fit_is_refused() {
    let (stack, mut terminals) = joint();
    let stack = Arc::new(stack);
    let mut conduction = Conduction::new(&stack, &terminals, &METALS).expect("it fits");
    for value in [f64::NAN, -1.0, f64::INFINITY] {
        let refused = conduction.solve(&stack.uniform(value));
        assert!(matches!(refused, Err(Failure::NotFinite { .. })), "{value}");
    }
    assert!(matches!(conduction.solve(&[]), Err(Failure::Misfit { .. })));
    assert!(Conduction::new(&stack, &terminals, &METALS[..1]).is_err());
    terminals.sinks = Vec::new();
    assert!(Conduction::new(&stack, &terminals, &METALS).is_err());
    terminals.sinks = vec![Sink::Rim(Rim::Straight(Edge::North))];
    terminals.source = Source::Flux(vec![(
        Zone::Disc {
            centre: HOLES[0],
            radius: 1e-3,
        },
        1.0,
    )]);
    // All of it is hole.
    assert!(Conduction::new(&stack, &terminals, &METALS).is_err());
    let plan = Plan::new(even(1.0, 2), even(1.0, 2));
    assert!(Stack::new(plan.clone(), vec![plate(&[1.0; 3], (0.1, 1, 2))]).is_err());
    assert!(Stack::new(plan, vec![plate(&[1.0; 4], (0.1, 1, 4))]).is_err());
}

// The method allows 2 % from spacing to spacing; with one field for all grids they were 0.02 %.
#[test]
fn finer_grids_agree_better() {
    let case = Case::read("i");
    let of = |fine: f64| {
        let grid = Grid {
            fine,
            through: [(1, 2), (1, 2)],
        };
        let stack = case.stack(&grid);
        // A field that knows no grid: contact within 6.5 mm, by a smooth step of 1 mm.
        let local = (0..stack.plan().columns())
            .map(|column| {
                let [x, y] = stack.plan().place(column);
                let r = (x.abs() - 0.03).hypot(y.abs() - 0.03);
                1e5 * (1.0 - ((r - 0.004) / 0.0025).clamp(0.0, 1.0)) + 2000.0
            })
            .collect();
        let (heat, _) = solved(
            stack,
            &case.terminals("film2000"),
            &case.conductivity(),
            &[vec![local]],
        );
        heat.source_to_sink
    };
    let found = [4.0 / 3.0, 2.0 / 3.0, 1.0 / 3.0].map(of);
    let steps = [found[1] / found[0] - 1.0, found[2] / found[1] - 1.0];
    assert!(steps.iter().all(|step| step.abs() < 5e-4), "{steps:?}");
}
