//! The round solver against closed forms, each derived here from Fourier's law, and against balances.

use std::f64::consts::PI;

use super::*;
use crate::pressure::round::{self as contact, FaceFriction, HeadModel, Solution};

const FACE: Patch = Patch::Face;
const PERFECT: f64 = f64::INFINITY;
/// What rounding leaves: a slender element conducts thousands of times what its plate does.
const ROUNDING: f64 = 1e-10;

fn disc([hole_radius, rim_radius]: [f64; 2], thickness: f64, conductivity: f64) -> Disc {
    Disc {
        hole_radius,
        rim_radius,
        thickness,
        conductivity: [conductivity; 2],
    }
}

/// Plates of one plan, unlike in thickness and conductivity, in contact over a part.
fn pair(inlet: Inlet, outlet: Outlet) -> Problem {
    Problem {
        plates: [disc([0.6, 3.0], 0.7, 3.0), disc([0.6, 3.0], 1.9, 0.4)],
        bearing_radius: 1.0,
        contact_radius: 1.8,
        inlet,
        outlet,
        shank: 0.0,
    }
}

fn solved(problem: &Problem, conductance: impl Fn(f64) -> f64) -> Heat {
    let plates = condense(problem).expect("the plates condense");
    plates.solve(conductance).expect("the heat is found")
}

fn same(found: f64, wanted: f64, tolerance: f64, what: &str) {
    let off = found / wanted - 1.0;
    assert!(off.abs() < tolerance, "{what}: {found} {wanted} {off:+.2e}");
}

/// Every way in that keeps heat upright, with every way out.
fn upright() -> Vec<(Inlet, Outlet)> {
    vec![
        (Inlet::Isothermal(FACE), Outlet::IsothermalBack),
        (Inlet::Isothermal(FACE), Outlet::Film(0.8)),
        (Inlet::Flux(FACE), Outlet::IsothermalBack),
        (Inlet::Flux(FACE), Outlet::Film(0.8)),
        (Inlet::Flux(FACE), Outlet::Flux(FACE)),
    ]
}

// Resistances of walls in series, t/(k A) and 1/(h A): the elements contain straight lines, so that
// rounding alone is left, as it is in the rings of the upper bound.
#[test]
fn an_even_conductance_is_a_composite_wall() {
    let area = PI * (9.0 - 0.36);
    let [first, second, between] = [0.7 / 3.0, 1.9 / 0.4, 1.0 / 2.5].map(|depth| depth / area);
    let whole = first + between + second;
    for (inlet, outlet) in upright() {
        let heat = solved(&pair(inlet, outlet), |_| 2.5);
        let path = &heat.path;
        let what = format!("{inlet:?} {outlet:?}");
        for (found, wanted) in [
            (path.contact, 2.5 * area),
            (path.source_to_sink, whole),
            (path.perfect_contact, first + second),
            (path.interface_drop, between),
            (path.node_to_node, 0.5 * (first + second) + between),
            (path.hottest, whole),
            (path.resistance_lower, whole),
            (heat.plate_mean[0], 0.5 * first + between + second),
            (heat.plate_mean[1], 0.5 * second),
        ] {
            same(found, wanted, ROUNDING, &what);
        }
        let upper = path.resistance_upper.expect("equal discs heated all over");
        same(upper, whole, ROUNDING, &what);
        let film = path.coolant_drop.map_or(0.0, |drop| drop * area);
        let wanted = if outlet == Outlet::Film(0.8) {
            1.25
        } else {
            0.0
        };
        assert!((film - wanted).abs() < ROUNDING, "{what}: {film}");
        assert!(heat.health.heat_balance < ROUNDING, "{what}");
        assert!(heat.health.coarser_grid.abs() < ROUNDING, "{what}");
        // Faces are isothermal, and temperature falls in a straight line through each plate.
        let depths = [0.7 / 3.0 / area, 1.9 / 0.4 / area];
        for (plate, meridian) in heat.meridians.iter().enumerate() {
            let foot = [second + between, second][plate];
            let sign = [1.0, -1.0][plate];
            for column in &meridian.temperatures {
                for (height, found) in meridian.heights.iter().zip(column) {
                    let share = height / [0.7, 1.9][plate];
                    let wanted = foot + sign * share * depths[plate];
                    assert!((found - wanted).abs() < ROUNDING * whole, "{what} {plate}");
                }
            }
        }
    }
}

// Nothing crosses beyond the zone, so that it resists more than contact all over; a zone over the whole
// face is contact all over.
#[test]
fn perfect_contact_in_a_zone_is_what_the_same_conductance_gives() {
    let problem = pair(Inlet::Flux(FACE), Outlet::Film(0.8));
    let plates = condense(&problem).unwrap();
    let inside = |radius: f64| if radius < 1.8 { PERFECT } else { 0.0 };
    let heat = plates.solve(inside).unwrap();
    same(
        plates.perfect_in_zone(),
        heat.path.source_to_sink,
        ROUNDING,
        "zone",
    );
    assert!(plates.perfect_in_zone() > 1.01 * plates.perfect_contact());
    let whole = Problem {
        contact_radius: 3.0,
        ..problem
    };
    let whole = condense(&whole).unwrap();
    same(
        whole.perfect_in_zone(),
        whole.perfect_contact(),
        ROUNDING,
        "whole",
    );
}

// Faces that touch perfectly are one wall, however its ends are given: nothing drops between them.
#[test]
fn perfect_contact_is_one_wall() {
    let area = PI * (9.0 - 0.36);
    let wall = (0.7 / 3.0 + 1.9 / 0.4) / area;
    for (inlet, outlet) in upright() {
        let heat = solved(&pair(inlet, outlet), |_| PERFECT);
        let what = format!("{inlet:?} {outlet:?}");
        same(heat.path.source_to_sink, wall, ROUNDING, &what);
        assert!(heat.path.interface_drop.abs() < ROUNDING * wall, "{what}");
        assert!(heat.path.added_by_joint.abs() < ROUNDING * wall, "{what}");
        assert!(heat.health.heat_balance < ROUNDING, "{what}");
    }
}

// A head as wide as the plate takes its heat evenly from the face, so that both ways stay upright: the
// shank stands beside plates and faces as one conductance beside another.
#[test]
fn a_shank_under_a_head_as_wide_as_the_plate_is_a_path_in_parallel() {
    let area = PI * (9.0 - 0.36);
    let wall = |h: f64| (0.7 / 3.0 + 1.9 / 0.4 + f64::recip(h)) / area;
    for (inlet, outlet) in upright() {
        let problem = Problem {
            bearing_radius: 3.0,
            shank: 7.0,
            ..pair(inlet, outlet)
        };
        let plates = condense(&problem).unwrap();
        let what = format!("{inlet:?} {outlet:?}");
        for h in [2.5, PERFECT] {
            let heat = plates.solve(|_| h).unwrap();
            let exact = (wall(h).recip() + 7.0).recip();
            same(heat.path.source_to_sink, exact, ROUNDING, &what);
            same(heat.path.resistance_lower, exact, ROUNDING, &what);
            assert!(heat.health.heat_balance < ROUNDING, "{what} {h}");
        }
        // Faces apart in vacuum: the shank alone.
        let heat = plates.solve(|_| 0.0).unwrap();
        same(heat.path.source_to_sink, 1.0 / 7.0, ROUNDING, &what);
    }
}

// With faces apart all heat takes the shank, and what the plates add under narrow heads is the same for
// every shank; their own spreading makes it more than nothing.
#[test]
fn a_shank_alone_stands_in_series_with_its_plates() {
    for (inlet, outlet) in upright() {
        let apart = |shank: f64| {
            let problem = Problem {
                shank,
                ..pair(inlet, outlet)
            };
            let heat = solved(&problem, |_| 0.0);
            assert!(heat.health.heat_balance < ROUNDING, "{inlet:?} {outlet:?}");
            heat.path.source_to_sink
        };
        assert!(apart(0.0).is_infinite());
        let what = format!("{inlet:?} {outlet:?}");
        let plates = apart(0.5) - 2.0;
        let held = matches!(inlet, Inlet::Isothermal(_)) && outlet == Outlet::IsothermalBack;
        // Between planes that are held the shank bridges all of it.
        assert_eq!(plates > 1e-3, !held, "{what} {plates}");
        same(apart(0.05), plates + 20.0, ROUNDING, &what);
    }
}

// Fourier's law between concentric circles: ln(b/a)/(2π k t). A small plate feeds a wide one held at its
// rim; between two widths of it what happens near the small one drops out, but for exp(−π Δr/t).
#[test]
fn heat_to_a_held_rim_falls_by_the_logarithm() {
    let (thickness, conductivity) = (0.2, 1.7);
    for hole in [0.0, 0.4] {
        let resistance = |rim: f64| {
            let problem = Problem {
                plates: [
                    disc([hole, 1.0], 0.3, 5.0),
                    disc([hole, rim], thickness, conductivity),
                ],
                bearing_radius: 0.8,
                contact_radius: 1.0,
                inlet: Inlet::Isothermal(FACE),
                outlet: Outlet::Rim,
                shank: 0.0,
            };
            let heat = solved(&problem, |_| 4.0);
            assert!(heat.health.heat_balance < ROUNDING);
            // The rim is held: what is told is above it.
            let back = &heat.profiles.outer[1];
            assert!(back.temperatures.last().unwrap().abs() < ROUNDING);
            heat.path.source_to_sink
        };
        let exact = (2.0_f64).ln() / (2.0 * PI * conductivity * thickness);
        // Curved lines between wide grid lines.
        same(resistance(4.0) - resistance(2.0), exact, 1e-4, "rim");
    }
}

/// Modified Bessel functions of the first kind, of order 0 and 1, by their power series.
fn bessel(x: f64) -> [f64; 2] {
    let (mut term, mut sums) = (1.0, [0.0; 2]);
    for k in 0..60_u32 {
        let k = f64::from(k);
        sums[0] += term;
        sums[1] += term * 0.5 * x / (k + 1.0);
        term *= (0.5 * x / (k + 1.0)).powi(2);
    }
    sums
}

// Thin discs are fins: θ = T1 − T2 obeys θ'' + θ'/r = m² θ with m² = 2/(k t (1/h + 2t/(3k))), finite on
// the axis, so that 1/R = π b k t m I₁(m b)/I₀(m b). Source: radial fin, Carslaw & Jaeger, from memory.
#[test]
fn thin_discs_from_rim_to_rim_are_a_radial_fin() {
    let (rim, t, h): (f64, f64, f64) = (3.0, 0.05, 0.04);
    let problem = Problem {
        plates: [disc([0.0, rim], t, 1.0); 2],
        bearing_radius: 1.0,
        contact_radius: 1.5,
        inlet: Inlet::Rim,
        outlet: Outlet::Rim,
        shank: 0.0,
    };
    let heat = solved(&problem, |_| h);
    let m = (2.0 / (t * (1.0 / h + 2.0 * t / 3.0))).sqrt();
    let [zero, one] = bessel(m * rim);
    let exact = zero / (PI * rim * t * m * one);
    // What the fin leaves out is a share of (m t)², 4e-3; 2e-5 measured.
    same(heat.path.source_to_sink, exact, 1e-4, "fin");
    assert!(heat.health.heat_balance < ROUNDING);
    // The drop on the axis over that at the rim, where both plates are held one kelvin apart.
    let [first, second] = &heat.profiles.inner;
    let axis = first.temperatures[0] - second.temperatures[0];
    let last = first.temperatures.len() - 1;
    let at_rim = first.temperatures[last] - second.temperatures[last];
    // Of θ, between means over the thickness, the faces have 1/h of 1/h + 2t/(3k).
    let faces = zero.recip() / (1.0 + 2.0 * t * h / 3.0);
    same(axis / at_rim, faces, 1e-4, "axis");
    // Two hundred rings tell the same from above.
    let upper = heat.path.resistance_upper.unwrap();
    same(upper, exact, 2e-4, "rings");
    // Held rims that touch leave nothing.
    assert!(heat.path.perfect_contact.abs() < f64::MIN_POSITIVE);
}

// A bonded pair over a film is one fin of both thicknesses: θ'' + θ'/r = m² θ, m² = 1/(2t k (1/h + 2t/(3k))),
// with h the film. Of its rim one half is held, which adds ln 2/(π k) over the length of the rim: a strip
// held over a part s of its end adds 2/(π k) ln(1/sin(π s/2)). Source: both textbook, from memory.
#[test]
fn a_bonded_pair_over_a_film_is_one_fin() {
    let (rim, t, film): (f64, f64, f64) = (3.0, 0.02, 0.01);
    let problem = Problem {
        plates: [disc([0.0, rim], t, 1.0); 2],
        bearing_radius: 1.0,
        contact_radius: 3.0,
        inlet: Inlet::Rim,
        outlet: Outlet::Film(film),
        shank: 0.0,
    };
    let heat = solved(&problem, |_| PERFECT);
    let m = (2.0 * t * (1.0 / film + 2.0 * t / 3.0)).sqrt().recip();
    let [zero, one] = bessel(m * rim);
    let fin = zero / (2.0 * PI * rim * 2.0 * t * m * one);
    let corner = 2.0_f64.ln() / PI / (2.0 * PI * rim);
    let exact = fin + corner - 1.0 / (film * PI * rim * rim);
    // The fin counts 2t/(3 k A) for the way across the thickness; at a rim held in part that is open.
    let open = 2.0 * t / 3.0 / (PI * rim * rim);
    let off = heat.path.source_to_sink - exact;
    assert!(off.abs() < open, "{off:+.2e} {open:.2e}");
    // What a tied node passes on is a small difference of what thin plates conduct across.
    assert!(heat.health.heat_balance < 1e-8);
}

// Fourier's law is linear: what conducts a million times as well resists a millionth, and the balance, which
// is told over the heat, stays what rounding leaves.
#[test]
fn plates_a_million_times_as_good_resist_a_millionth() {
    let one = pair(Inlet::Isothermal(FACE), Outlet::Film(0.8));
    let mut other = pair(Inlet::Isothermal(FACE), Outlet::Film(0.8e6));
    for plate in &mut other.plates {
        plate.conductivity = plate.conductivity.map(|value| 1e6 * value);
    }
    let law = |radius: f64| 2.5 / radius;
    let one = solved(&one, law);
    let other = solved(&other, |radius| 1e6 * law(radius));
    let [own, scaled] = [&one, &other].map(|heat| heat.path.source_to_sink);
    same(1e6 * scaled, own, ROUNDING, "resistance");
    for heat in [one, other] {
        assert!(heat.health.heat_balance < ROUNDING, "{:?}", heat.health);
    }
}

// Heat turned round takes the same way: exchanged plates and ends resist alike (reciprocity). Every grid
// is the same, the order of elimination is not.
#[test]
fn plates_exchanged_resist_alike() {
    let shaken = |radius: f64| 3.0 * (1.8 - radius).max(0.0) + 0.01;
    let zone = |radius: f64| if radius < 1.8 { PERFECT } else { 0.01 };
    let all = |_: f64| PERFECT;
    let laws: [&dyn Fn(f64) -> f64; 3] = [&shaken, &zone, &all];
    for [(inlet, outlet), (back, front)] in [
        [
            (Inlet::Isothermal(FACE), Outlet::Rim),
            (Inlet::Rim, Outlet::IsothermalBack),
        ],
        [
            (Inlet::Isothermal(FACE), Outlet::IsothermalBack),
            (Inlet::Isothermal(FACE), Outlet::IsothermalBack),
        ],
        [
            (Inlet::Flux(FACE), Outlet::Flux(Patch::Annulus([0.9, 2.1]))),
            (Inlet::Flux(Patch::Annulus([0.9, 2.1])), Outlet::Flux(FACE)),
        ],
    ] {
        let mut one = pair(inlet, outlet);
        one.plates[1].hole_radius = 0.75;
        one.shank = 0.3;
        let other = Problem {
            plates: [one.plates[1], one.plates[0]],
            inlet: back,
            outlet: front,
            ..one
        };
        let [one, other] = [one, other].map(|problem| condense(&problem).unwrap());
        for (index, law) in laws.iter().enumerate() {
            let [one, other] = [&one, &other].map(|plates| plates.solve(law).unwrap());
            let what = format!("{inlet:?} {outlet:?} {index}");
            same(
                one.path.source_to_sink,
                other.path.source_to_sink,
                ROUNDING,
                &what,
            );
            for heat in [one, other] {
                assert!(heat.health.heat_balance < ROUNDING, "{what}");
            }
        }
    }
}

// A film far weaker than the faces on plates so small that an area is far below one: the plates stand
// near the source, and differences of their temperatures keep their digits.
#[test]
fn a_weak_film_under_small_plates_loses_no_digits() {
    let side = 1e-3;
    let mut problem = pair(Inlet::Isothermal(FACE), Outlet::Film(2e-5));
    for plate in &mut problem.plates {
        plate.hole_radius *= side;
        plate.rim_radius *= side;
        plate.thickness *= side;
    }
    problem.bearing_radius *= side;
    problem.contact_radius *= side;
    let h = 1e4;
    let heat = solved(&problem, |_| h);
    let area = PI * (9.0 - 0.36) * side * side;
    let exact = (0.7 / 3.0 * side + 1.9 / 0.4 * side + 1.0 / h) / area;
    // The film stands at 2e9 K/W, the wall at 187: 1e-7 of it would be lost beside the film, 1e-10 is.
    same(heat.path.source_to_sink, exact, 1e-9, "wall");
    assert!(
        heat.health.heat_balance < ROUNDING,
        "{}",
        heat.health.heat_balance
    );
}

// Quadratic elements hold r² and z² exactly: means over an annulus are (a² + b²)/2, over a thickness t²/3,
// whatever the lines, if places, weights and lines at the edges of a patch are right. Rounding of some
// thousand terms.
#[test]
fn weights_add_up_to_areas_and_know_their_places() {
    let patch = [1.3, 2.4];
    let problem = Problem {
        inlet: Inlet::Flux(Patch::Annulus(patch)),
        ..pair(Inlet::Rim, Outlet::Film(0.8))
    };
    let pair = Pair::new(&problem, mesh::Density::Coarse).unwrap();
    let [first, second] = &pair.plates;
    let squared = |plate: &Plate, axis: usize| -> Vec<f64> {
        plate.at.iter().map(|at| at[axis] * at[axis]).collect()
    };
    let mean = |[inner, outer]: [f64; 2]| 0.5 * (inner * inner + outer * outer);
    let weighted = plate::weighted;
    let whole = mean([0.6, 3.0]);
    for (index, plate) in [first, second].into_iter().enumerate() {
        let (radii, heights) = (squared(plate, 0), squared(plate, 1));
        let thickness = problem.plates[index].thickness;
        let heated = mean([patch, [0.6, 3.0]][index]);
        same(plate.area, PI * (9.0 - 0.36), 1e-13, "area");
        same(weighted(&plate.face_mean, &radii), whole, 1e-13, "face");
        same(weighted(&plate.patch_mean, &radii), heated, 1e-13, "patch");
        let top = weighted(&plate.face_mean, &heights);
        same(top, thickness * thickness, 1e-13, "top");
        let over = |values: &[f64]| -> f64 {
            let pairs = plate.volume_mean.iter().zip(values);
            pairs.map(|(weight, value)| weight * value).sum()
        };
        same(over(&radii), whole, 1e-12, "volume");
        same(over(&heights), thickness * thickness / 3.0, 1e-12, "height");
        // Serendipity: four corners and four middles of sides, shared between neighbours.
        let lines = plate.foot.len().div_ceil(2);
        let steps = (plate.at.len() - lines) / (3 * lines - 1);
        assert_eq!(
            plate.at.len(),
            lines * (2 * steps + 1) + (lines - 1) * (steps + 1)
        );
        for face in [&plate.foot, &plate.outer] {
            let radii: Vec<f64> = face.iter().map(|node| plate.at[*node][0]).collect();
            assert!(radii.windows(2).all(|pair| pair[0] < pair[1]), "{radii:?}");
        }
    }
}

// What goes in crosses and comes out, wherever it enters and however faces touch.
#[test]
fn heat_in_is_heat_across_is_heat_out() {
    let part = Patch::Annulus([1.2, 2.2]);
    for (inlet, outlet) in [
        (Inlet::Flux(part), Outlet::Film(0.2)),
        (Inlet::Isothermal(part), Outlet::Rim),
        (Inlet::Rim, Outlet::IsothermalBack),
        (Inlet::Rim, Outlet::Rim),
    ] {
        let mut problem = pair(inlet, outlet);
        problem.plates[0].rim_radius = 3.5;
        problem.shank = 0.3;
        let plates = condense(&problem).unwrap();
        let zone = |radius: f64| if radius < 1.8 { PERFECT } else { 0.01 };
        let outside = |radius: f64| if radius < 1.8 { 0.01 } else { PERFECT };
        let laws: [&dyn Fn(f64) -> f64; 3] = [&zone, &outside, &|radius| radius.recip()];
        for (index, law) in laws.iter().enumerate() {
            let heat = plates.solve(law).unwrap();
            let what = format!("{inlet:?} {outlet:?} {index}");
            assert!(
                heat.health.heat_balance < ROUNDING,
                "{what}: {:?}",
                heat.health
            );
            assert!(
                heat.path.source_to_sink >= heat.path.perfect_contact,
                "{what}"
            );
            assert_eq!(heat.path.resistance_upper, None, "{what}");
        }
    }
}

// The flux of the rings is admissible where they are whole and heated all over; elsewhere there is no
// upper bound, and where there is one it holds.
#[test]
fn an_upper_bound_is_told_where_the_rings_are_admissible() {
    let law = |radius: f64| 3.0 * (1.8 - radius).max(0.0) + 0.05;
    let sound = pair(Inlet::Flux(FACE), Outlet::Film(0.8));
    let heat = solved(&sound, law);
    let upper = heat
        .path
        .resistance_upper
        .expect("equal discs heated all over");
    // The rings read the conductance at their centres, 1e-4 as `cells` promises for half as many.
    assert!(heat.path.source_to_sink < upper * (1.0 + 1e-4));
    assert!(upper < 1.5 * heat.path.source_to_sink, "{upper}");
    let spoil: [fn(&mut Problem); 5] = [
        |problem| problem.inlet = Inlet::Flux(Patch::Annulus([1.2, 2.2])),
        |problem| problem.outlet = Outlet::Flux(Patch::Annulus([1.2, 2.2])),
        |problem| problem.plates[0].hole_radius = 0.5,
        |problem| problem.plates[1].rim_radius = 3.2,
        |problem| problem.plates[1].conductivity[0] = 0.5,
    ];
    for (index, spoil) in spoil.iter().enumerate() {
        let mut problem = sound;
        spoil(&mut problem);
        let heat = solved(&problem, law);
        assert_eq!(heat.path.resistance_upper, None, "{index}");
    }
}

/// A contact on plates whose rim lies at 3, its bearing at 1.
fn pressed() -> Solution {
    contact::solve(&contact::Problem {
        hole_radius: 0.6,
        bearing_radius: 1.0,
        rim_radius: 3.0,
        thickness: [0.7, 0.7],
        youngs_modulus: [1.0; 2],
        poisson: [0.3; 2],
        head: HeadModel::Uniform,
        faces: FaceFriction::Frictionless,
        // The edge is found roughly; nothing here asks where it is.
        tolerance: 0.01,
    })
    .expect("the contact converges")
}

#[test]
fn faces_conduct_by_pressure_where_they_press_and_by_their_gap_beyond() {
    let field = pressed();
    let law = Law {
        closed: |pressure: f64| 100.0 + pressure,
        parted: |gap: f64| 50.0 / (1.0 + gap),
    };
    let force = 3.0;
    let bits = |one: f64, other: f64| assert_eq!(one.to_bits(), other.to_bits());
    let inside = 0.5 * (0.6 + field.contact_radius);
    bits(
        law.at(&field, [force, inside]),
        100.0 + field.pressure(inside, force),
    );
    let outside = 0.5 * (3.0 + field.contact_radius);
    let gap = field.gap(outside, force);
    assert!(field.pressure(inside, force) > 0.0 && gap > 0.0);
    bits(law.at(&field, [force, outside]), 50.0 / (1.0 + gap));
    // Beyond the plates of the contact its rim, and within its hole the hole.
    bits(law.at(&field, [force, 3.4]), law.at(&field, [force, 3.0]));
    bits(law.at(&field, [force, 0.1]), law.at(&field, [force, 0.6]));
    // More force conducts more, and every force is solved as if alone.
    let plates = condense(&pair(Inlet::Flux(FACE), Outlet::Film(0.8))).unwrap();
    let forces = [1.0, 3.0];
    let heats = heat_under(&plates, (&field, &forces), &law).unwrap();
    for (heat, force) in heats.iter().zip(forces) {
        let alone = plates
            .solve(|radius| law.at(&field, [force, radius]))
            .unwrap();
        assert_eq!(*heat, alone);
    }
}

// Flux given on a ring leads away from it on all sides: no place is hotter than one of its own.
#[test]
fn a_heated_ring_is_hottest_on_its_face() {
    let ring = [1.4, 2.0];
    let heat = solved(
        &pair(Inlet::Flux(Patch::Annulus(ring)), Outlet::IsothermalBack),
        |_| 2.5,
    );
    let place = heat.hottest_at;
    assert_eq!(place.height.to_bits(), 0.7_f64.to_bits());
    assert!(
        ring[0] < place.radius && place.radius < ring[1],
        "{place:?}"
    );
    let top = &heat.profiles.outer[0].temperatures;
    let hottest = top.iter().copied().fold(0.0, f64::max);
    assert_eq!(heat.path.hottest.to_bits(), hottest.to_bits());
    assert!(heat.path.hottest > heat.path.source_to_sink);
}
