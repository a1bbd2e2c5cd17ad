//! Stacks whose heat runs straight, against walls in series and in parallel; what is refused.

use std::{f64::consts::PI, sync::Arc};

use super::*;
use crate::{numerics::columns::Plan, resistance::Failure};

const SIZE: [f64; 2] = [0.08, 0.05];
const AREA: f64 = 0.08 * 0.05;
const THICKNESS: [f64; 2] = [0.006, 0.010];
const CONDUCTIVITY: [f64; 2] = [167.0, 15.0];
const FILM: f64 = 800.0;
/// Conjugate gradients leave 1e-8 of the load; what passes is off by less.
const SOLVED: f64 = 1e-7;

fn lines(length: f64, count: u32) -> Vec<f64> {
    // Cells that grow: nothing here may hang on even ones.
    let at = |line: u32| (f64::from(line) / f64::from(count)).powf(1.2);
    (0..=count).map(|line| length * at(line)).collect()
}

fn plan() -> Plan {
    Plan::new(lines(SIZE[0], 8), lines(SIZE[1], 6))
}

fn slab(heights: &[f64]) -> Slab {
    Slab {
        shares: vec![1.0; plan().cells()],
        heights: heights.to_vec(),
        degree: 2,
    }
}

fn whole(heights: &[f64]) -> Body {
    Body {
        layers: vec![slab(heights)],
    }
}

/// Two whole plates; the lower one of two layers and of elements that end 4 mm below its top.
fn stack() -> Stack {
    let lower = Body {
        layers: vec![slab(&[0.003]), slab(&[0.003, 0.004])],
    };
    Stack::new(plan(), vec![whole(&[THICKNESS[0]]), lower]).expect("the bodies fit")
}

fn bolt(at: [f64; 2], strength: f64) -> Bolt {
    // Wider than the plates: the whole face is under the head and on the nut.
    Bolt {
        at,
        head: [0.0, 0.2],
        seat: Seat::Nut {
            annulus: [0.0, 0.2],
        },
        strength,
    }
}

fn terminals(bolts: Vec<Bolt>) -> Terminals {
    Terminals {
        source: Source::Flux(vec![(Zone::Face, 1.0)]),
        sinks: vec![Sink::Film {
            zone: Zone::Face,
            coefficient: FILM,
        }],
        bolts,
    }
}

fn conductivity() -> [Conductivity; 2] {
    CONDUCTIVITY.map(Conductivity::isotropic)
}

fn solved(stack: &Stack, terminals: &Terminals, local: f64) -> Heat {
    let stack = Arc::new(stack.clone());
    let mut conduction =
        Conduction::new(&stack, terminals, &conductivity()).expect("the terminals fit");
    let local = stack.uniform(local);
    conduction.solve(&local).expect("the heat is found")
}

/// Through both plates, K/W.
fn through() -> [f64; 2] {
    [0, 1].map(|plate| THICKNESS[plate] / CONDUCTIVITY[plate] / AREA)
}

fn same(found: f64, wanted: f64, what: &str) {
    let off = found / wanted - 1.0;
    assert!(off.abs() < SOLVED, "{what}: {found} {wanted} {off:+.2e}");
}

// Fourier's law in one dimension: t/(k A), 1/(h A) and 1/(h_s A) in series.
#[test]
fn an_even_conductance_is_a_composite_wall() {
    let local = 3000.0;
    let [first, second] = through();
    let between = 1.0 / (local * AREA);
    let film = 1.0 / (FILM * AREA);
    let places = [[0.02, 0.025], [0.07, 0.025]];
    let terminals = terminals(places.map(|at| bolt(at, 0.0)).to_vec());
    let heat = solved(&stack(), &terminals, local);
    let wall = first + between + second;
    same(heat.contact, local * AREA, "contact");
    same(heat.contact_per_interface[0], local * AREA, "interface");
    same(heat.source_to_sink, wall, "source to sink");
    same(heat.zones[0], wall, "zone");
    same(heat.one_dimensional, wall, "bound");
    same(heat.hottest.rise, wall, "hottest");
    same(heat.sink_mean, film, "sink");
    same(heat.coolant_drop.expect("a film"), film, "coolant");
    same(heat.interface_drops[0], between, "drop");
    same(heat.body_means[1], 0.5 * second, "second body");
    same(
        heat.body_means[0],
        second + between + 0.5 * first,
        "first body",
    );
    same(heat.node_to_node, 0.5 * (first + second) + between, "nodes");
    let counts = [
        heat.interface_drops.len(),
        heat.flux.len(),
        heat.flux[0].len(),
    ];
    assert_eq!(counts, [1; 3]);
    for flux in &heat.flux[0][0] {
        same(*flux, 1.0 / AREA, "flux");
    }
    // Every column belongs to the bolt nearer to it: those left of the middle line to the first.
    let plan = plan();
    let left: f64 = (0..plan.columns())
        .filter(|column| plan.place(*column)[0] < 0.045)
        .map(|column| local * stack().faces()[0][0].weights[column])
        .sum();
    assert_eq!(heat.contact_per_bolt.len(), 2);
    same(heat.contact_per_bolt[0], left, "first bolt");
    same(heat.contact_per_bolt[1], local * AREA - left, "second bolt");
}

// Two zones of uniform flux that divide the face in proportion to their areas are an even flux.
#[test]
fn zones_that_share_the_heat_by_area_are_the_whole_face() {
    let mut terminals = terminals(Vec::new());
    let zone = |low: f64, high: f64| Zone::Rectangle {
        low: [low, 0.0],
        high: [high, SIZE[1]],
    };
    let zones = [(zone(0.0, 0.03), 3.0), (zone(0.03, 0.08), 5.0)];
    terminals.source = Source::Flux(zones.to_vec());
    let heat = solved(&stack(), &terminals, 3000.0);
    let [first, second] = through();
    let wall = first + second + 1.0 / (3000.0 * AREA);
    same(heat.source_to_sink, wall, "source to sink");
    same(heat.zones[0], wall, "first zone");
    same(heat.zones[1], wall, "second zone");
}

// A head and a nut as wide as the plates take and give heat evenly: the bolt is a path in parallel.
#[test]
fn a_bolt_over_the_whole_face_stands_beside_the_wall() {
    let [first, second] = through();
    let wall = first + second + 1.0 / (500.0 * AREA);
    let terminals = terminals(vec![bolt([0.03, 0.02], 4.0)]);
    let heat = solved(&stack(), &terminals, 500.0);
    let exact = (1.0 / wall + 4.0).recip();
    same(heat.source_to_sink, exact, "source to sink");
    same(heat.one_dimensional, exact, "bound");
    // Faces apart in vacuum leave the bolt.
    let heat = solved(&stack(), &terminals, 0.0);
    same(heat.source_to_sink, 0.25, "bolt alone");
}

// Heat given off evenly over the depth d of a thread: d/(3 k A) in mean above its end, as in any wall that
// is heated evenly and cold on one side, then (t − d)/(k A).
#[test]
fn a_thread_gives_off_its_heat_over_its_depth() {
    let depth = 0.004;
    let mut bolt = bolt([0.03, 0.02], 2.0);
    bolt.seat = Seat::Thread {
        annulus: [0.0, 0.2],
        depth,
    };
    let heat = solved(&stack(), &terminals(vec![bolt]), 0.0);
    let below = (depth / 3.0 + THICKNESS[1] - depth) / CONDUCTIVITY[1] / AREA;
    same(heat.source_to_sink, 0.5 + below, "source to sink");
}

// Integrals of polynomials that add up to one are lengths, and moments those of the span.
#[test]
fn spans_have_their_length_and_their_middle() {
    let body = &stack().bodies[1];
    let heights = body.heights();
    for span in [[0.0, 0.010], [0.001, 0.0045], [0.006, 0.010]] {
        let loads = body.span(span);
        let length: f64 = loads.iter().map(|(_, load, _)| load).sum();
        let moments = loads.iter().map(|(node, load, _)| heights[*node] * load);
        let moment: f64 = moments.sum();
        let exact = span[1] - span[0];
        same(length, exact, "length");
        same(moment, 0.5 * (span[0] + span[1]) * exact, "moment");
        // The first layer ends at 3 mm.
        let low: f64 = loads
            .iter()
            .filter(|load| load.2 == 0)
            .map(|load| load.1)
            .sum();
        let share = (0.003_f64.min(span[1]) - span[0]).max(0.0);
        assert!((low - share).abs() < 1e-15, "{low} {share}");
    }
}

// From side to side a plate is a bar: L/(k w t). A straight side is held through a millionth of a cell.
#[test]
fn a_plate_from_side_to_side_is_a_bar() {
    let stack = Arc::new(Stack::new(plan(), vec![whole(&[0.002, 0.003])]).expect("it fits"));
    for (from, to, along) in [
        (Edge::West, Edge::East, 0),
        (Edge::South, Edge::North, 1),
        (Edge::North, Edge::South, 1),
    ] {
        let terminals = Terminals {
            source: Source::Rim(Rim::Straight(from)),
            sinks: vec![Sink::Rim(Rim::Straight(to))],
            bolts: Vec::new(),
        };
        let conductivity = [Conductivity::isotropic(20.0)];
        let perfect = Perfect::new(&stack, &terminals, &conductivity).expect("it is solved");
        let exact = SIZE[along] / (20.0 * SIZE[1 - along] * 0.005);
        let off = perfect.source_to_sink / exact - 1.0;
        assert!(off.abs() < 1e-6, "{from:?} {off:+.2e}");
    }
}

// Functions of the columns add up to one and hold straight lines: 2π R along a circle, with the moments
// of its centre; a quarter of it where the plan ends at its middle lines.
#[test]
fn a_round_rim_has_its_length_and_its_centre() {
    let plan = plan();
    let shares = vec![1.0; plan.cells()];
    let rim = |centre: [f64; 2], radius: f64| {
        let covered = Rim::Round { centre, radius }.covered(&plan, &shares);
        let moment = |axis: usize| -> f64 {
            let weights = covered.weights.iter().enumerate();
            weights
                .map(|(column, w)| w * plan.place(column)[axis])
                .sum()
        };
        [covered.area(), moment(0), moment(1)]
    };
    let near = |found: [f64; 3], wanted: [f64; 3]| {
        for (found, wanted) in found.iter().zip(wanted) {
            // Four points of Gauss on every arc within a cell.
            assert!((found / wanted - 1.0).abs() < 1e-7, "{found} {wanted}");
        }
    };
    let length = 2.0 * PI * 0.02;
    near(
        rim([0.045, 0.026], 0.02),
        [length, 0.045 * length, 0.026 * length],
    );
    // The centre of a quarter of a circle lies 2R/π from both of its radii.
    let quarter = 0.25 * length;
    let moment = 0.02 * 2.0 / PI * quarter;
    near(rim([0.0, 0.0], 0.02), [quarter, moment, moment]);
}

#[test]
fn places_serve_every_strength_of_the_same_bolts() {
    let stack = Arc::new(stack());
    let given = terminals(vec![bolt([0.03, 0.02], 4.0)]);
    let placed = Placed::new(&stack, &given).expect("the terminals fit");
    let mut other = given.clone();
    other.bolts[0].strength = 1.0;
    let weaker = placed.under(&other).expect("strength alone differs");
    let local = stack.uniform(500.0);
    let of = |placed: &Placed| {
        let mut conduction = Conduction::placed(placed, &conductivity()).expect("it fits");
        conduction.solve(&local).expect("the heat is found")
    };
    let anew = solved(&stack, &other, 500.0);
    assert_eq!(
        of(&weaker).source_to_sink.to_bits(),
        anew.source_to_sink.to_bits()
    );
    other.bolts[0].at[0] += 0.001;
    assert!(placed.under(&other).is_none());
    other.bolts.clear();
    assert!(placed.under(&other).is_none());
}

// Whoever asks for less gets it sooner, and no worse than asked for.
#[test]
fn a_loose_tolerance_takes_fewer_iterations() {
    let stack = Arc::new(stack());
    let mut terminals = terminals(Vec::new());
    let low = [0.01, 0.01];
    let zone = Zone::Rectangle {
        low,
        high: [0.03, 0.02],
    };
    terminals.source = Source::Flux(vec![(zone, 1.0)]);
    let of = |tolerance: f64| {
        let mut conduction =
            Conduction::new(&stack, &terminals, &conductivity()).expect("the terminals fit");
        conduction.tolerance = tolerance;
        conduction
            .solve(&stack.uniform(3000.0))
            .expect("it is solved")
    };
    let [tight, loose] = [1e-8, 1e-5].map(of);
    let iterations = [&tight, &loose].map(|heat| heat.health.iterations);
    assert!(iterations[1] < iterations[0], "{iterations:?}");
    assert!(tight.health.residual < 1e-8);
    // One iteration takes less than a digit: it stops where it was asked to.
    let left = loose.health.residual;
    assert!(left < 1e-5 && left > 1e-6, "{left:.1e}");
    let off = loose.source_to_sink / tight.source_to_sink - 1.0;
    assert!(off.abs() < 1e-5, "{off:+.2e}");
    // However loose, it goes on until no more is lost than may be, and is not refused for it.
    for tolerance in [1e-4, 1e-3, 1e-2] {
        assert!(of(tolerance).health.balance <= 1e-6, "{tolerance}");
    }
}

// Parts of a layer stand beside each other: conductivities add by share.
#[test]
fn parts_of_a_layer_conduct_by_their_share() {
    let part = Part {
        shares: vec![0.25; plan().cells()],
        conductivity: Conductivity::isotropic(75.0),
    };
    let made = stack().made_of((1, 1), vec![part]).expect("it fits");
    let heat = solved(&made, &terminals(Vec::new()), 3000.0);
    let [first, _] = through();
    // The upper 7 mm of the lower plate are of 0.25 · 75 + 0.75 · 15 W/(m K).
    let second = (0.003 / 15.0 + 0.007 / 30.0) / AREA;
    same(
        heat.source_to_sink,
        first + second + 1.0 / (3000.0 * AREA),
        "parts",
    );
}

#[test]
fn parts_that_cannot_be_are_refused() {
    let cells = plan().cells();
    let part = |share: f64, conductivity: f64| Part {
        shares: vec![share; cells],
        conductivity: Conductivity::isotropic(conductivity),
    };
    let refused = |place: (usize, usize), parts: Vec<Part>| stack().made_of(place, parts).is_err();
    assert!(!refused((1, 1), vec![part(0.5, 1.0), part(0.5, 2.0)]));
    assert!(refused((1, 1), vec![part(0.6, 1.0), part(0.5, 2.0)]));
    assert!(refused((1, 1), vec![part(0.5, 0.0)]));
    assert!(refused((1, 1), vec![part(0.5, f64::NAN)]));
    assert!(refused((1, 1), vec![part(-0.5, 1.0)]));
    assert!(refused((1, 2), vec![part(0.5, 1.0)]));
    assert!(refused((2, 0), vec![part(0.5, 1.0)]));
    let mut short = part(0.5, 1.0);
    short.shares.pop();
    assert!(refused((1, 1), vec![short]));
}

#[test]
fn an_interface_off_its_bodies_is_refused() {
    let columns = plan().columns();
    let sound = Meeting {
        upper: 0,
        lower: stack().bodies[1].nodes() - 1,
        weights: vec![AREA / columns as f64; columns],
    };
    let divided = |interface: usize, spoil: fn(&mut Meeting)| {
        let mut meeting = sound.clone();
        spoil(&mut meeting);
        stack().meeting(interface, vec![meeting])
    };
    let kept = divided(0, |_| ()).expect("it fits");
    assert_eq!(kept.faces()[0], std::slice::from_ref(&sound));
    for spoil in [
        |meeting: &mut Meeting| meeting.upper = 3,
        |meeting: &mut Meeting| meeting.lower = 7,
        |meeting: &mut Meeting| meeting.weights.truncate(5),
        |meeting: &mut Meeting| meeting.weights[0] = -1.0,
        |meeting: &mut Meeting| meeting.weights[0] = f64::NAN,
    ] {
        assert!(matches!(divided(0, spoil), Err(Failure::Misfit { .. })));
    }
    // Two bodies meet once.
    assert!(divided(1, |_| ()).is_err());
    assert!(divided(2, |_| ()).is_err());
    assert!(stack().meeting(0, Vec::new()).is_err());
}

#[test]
fn a_sink_off_the_body_is_refused() {
    let stack = Arc::new(stack());
    let off = [
        Sink::Rim(Rim::Round {
            centre: [1.0, 1.0],
            radius: 0.1,
        }),
        Sink::Held(Zone::Disc {
            centre: [1.0, 1.0],
            radius: 0.1,
        }),
    ];
    for sink in off {
        let mut terminals = terminals(Vec::new());
        terminals.sinks = vec![sink];
        let refused = Placed::new(&stack, &terminals).map(|_| ());
        let what = "every sink must cover solid";
        assert_eq!(refused, Err(Failure::Misfit { what }));
    }
}
