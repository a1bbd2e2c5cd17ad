//! What must hold for every plan: areas, force, symmetry, units, bounds, convergence.

use std::f64::consts::PI;

use proptest::prelude::*;

use super::*;
use crate::{
    joint::{ConeRule, ConeShape},
    pressure::cone,
    resistance::{
        Load,
        fixtures::{CROWD, assert_same, case_i, crowded, load, pair, power_law, round},
    },
};

#[test]
fn ring_sum_of_the_reference_round_joint() {
    let path = cells(&round(DEFAULT_RINGS))
        .unwrap()
        .solve(&load(power_law, &[2000.0], &[0.0]));
    // Known to the five digits printed with the reference joint.
    assert!(
        (path.contact / 40.226 - 1.0).abs() < 5e-5,
        "{}",
        path.contact
    );
}

#[test]
fn ring_sum_of_reference_case_i() {
    let path = cells(&case_i())
        .unwrap()
        .solve(&load(power_law, &[5000.0; 4], &[0.0; 4]));
    // 381.6 W/K in the three-dimensional solution; the closed form promises 0.6 %.
    assert!(
        (path.contact / 381.6 - 1.0).abs() < 6e-3,
        "{}",
        path.contact
    );
}

#[test]
fn ring_sum_converges_at_second_order() {
    let sum = |rings| {
        cells(&round(rings))
            .unwrap()
            .solve(&load(power_law, &[2000.0], &[0.0]))
            .contact
    };
    let exact = sum(6400);
    let order = ((sum(50) - exact) / (sum(100) - exact)).log2();
    // The pressure falls like a root at the edge, where the rings are clustered to make up for it.
    assert!((order - 2.0).abs() < 0.15, "observed order {order}");
}

#[test]
fn ring_error_tells_the_error_left() {
    let path = |rings| {
        cells(&round(rings))
            .unwrap()
            .solve(&load(power_law, &[2000.0], &[0.0]))
    };
    let told = cells(&round(DEFAULT_RINGS))
        .unwrap()
        .ring_error(&load(power_law, &[2000.0], &[0.0]))
        .unwrap();
    let exact = path(3200).source_to_sink;
    let left = (path(DEFAULT_RINGS).source_to_sink / exact - 1.0).abs();
    assert!(left < told && told < 1e-3, "{left} left, {told} told");
}

#[test]
fn cells_cover_the_plates() {
    let plan = crowded(&CROWD);
    let cells = cells(&plan).unwrap();
    let hole = PI * 2.25e-3 * 2.25e-3;
    let disc = PI * 0.05 * 0.05 - 4.0 * hole;
    // The corner (0.05, 0.04) lies inside the disc, so the faying face is the whole small plate.
    let small = 0.05 * 0.04 - 4.0 * hole;
    // Closed forms on both sides.
    assert!((cells.plate_area[0] / small - 1.0).abs() < 1e-12);
    assert!((cells.plate_area[1] / disc - 1.0).abs() < 1e-12);
    assert!((cells.interface_area / small - 1.0).abs() < 1e-12);
    for plate in 0..2 {
        let rings: f64 = cells
            .fine
            .iter()
            .flat_map(|cell| &cell.rings.columns.plate_area[plate])
            .sum();
        assert!((rings / cells.plate_area[plate] - 1.0).abs() < 1e-9);
    }
}

#[test]
fn a_neighbours_large_hole_is_cut_out_of_the_cell_it_reaches_into() {
    let mut plan = crowded(&CROWD);
    // 11.2 mm apart: a hole of 6.5 mm radius crosses the border of the cells.
    plan.sites[1].hole_radius = [6.5e-3; 2];
    let cells = cells(&plan).unwrap();
    let holes = PI * (3.0 * 2.25e-3_f64.powi(2) + 6.5e-3_f64.powi(2));
    assert!((cells.interface_area / (0.05 * 0.04 - holes) - 1.0).abs() < 1e-12);
}

#[test]
fn equal_cells_are_told_once_and_share_the_heat() {
    let cells = cells(&case_i()).unwrap();
    assert!(cells.fine.iter().all(|cell| cell.like == 0));
    let together = cells.solve(&load(power_law, &[5000.0; 4], &[0.0; 4]));
    // A force that differs by 1e-9 makes every cell its own case.
    let forces = [5000.0, 5000.000005, 5000.00001, 5000.000015];
    let apart = cells.solve(&load(power_law, &forces, &[0.0; 4]));
    assert_same(&together, &apart, 1e-8);
    let first = together.contact_per_bolt[0];
    assert!(
        together
            .contact_per_bolt
            .iter()
            .all(|bolt| (bolt / first - 1.0).abs() < 1e-12)
    );
}

#[test]
fn cells_that_differ_in_their_heat_alone_are_told_apart() {
    let mut plan = case_i();
    plan.source.zone = Zone::Rectangle {
        centre: [0.03, 0.04],
        size: [0.04, 0.04],
    };
    let like: Vec<usize> = cells(&plan)
        .unwrap()
        .fine
        .iter()
        .map(|cell| cell.like)
        .collect();
    // Bolts 0 and 2 are mirrored in the middle line along x, and so are 1 and 3.
    assert_eq!(like, [0, 1, 0, 1]);
}

#[test]
fn an_isothermal_source_is_the_hottest_place() {
    let mut plan = case_i();
    plan.source.isothermal = true;
    let path = cells(&plan)
        .unwrap()
        .solve(&load(power_law, &[5000.0; 4], &[0.0; 4]));
    assert!((path.hottest / path.source_to_sink - 1.0).abs() < 1e-12);
}

#[test]
fn film_drop_is_that_of_the_whole_second_plate() {
    let cells = cells(&crowded(&CROWD)).unwrap();
    let path = cells.solve(&load(power_law, &[3000.0; 4], &[0.0; 4]));
    let exact = 1.0 / (800.0 * (PI * 0.05 * 0.05 - 4.0 * PI * 2.25e-3_f64.powi(2)));
    assert!((path.coolant_drop.unwrap() / exact - 1.0).abs() < 1e-12);
}

#[test]
fn overlapping_contacts_add_their_pressures() {
    let cells = cells(&crowded(&[[0.02, 0.02], [0.029, 0.021]])).unwrap();
    assert_eq!(cells.overlaps, [true, true]);
    let forces = [3000.0, 5000.0];
    // A law that rises with the square of the pressure tells where the pressures are.
    let square = |pressure: f64| (1e-6 * pressure).powi(2);
    let path = cells.solve(&load(square, &forces, &[0.0; 2]));
    let side = 0.5 * STEP;
    let counted: f64 = (0..800 * 1000)
        .map(|index| {
            let point = [
                (f64::from(index % 1000) + 0.5) * side,
                (f64::from(index / 1000) + 0.5) * side,
            ];
            square(cells.pressure_at(point, &forces).unwrap_or(0.0)) * side * side
        })
        .sum();
    // Holes on a grid of 0.05 mm, and 48 patches a turn.
    assert!(
        (path.contact / counted - 1.0).abs() < 1e-3,
        "{} {counted}",
        path.contact
    );
}

#[test]
fn order_of_the_bolts_changes_nothing() {
    let forces = [3000.0, 2500.0, 4000.0, 3500.0];
    let shanks = [0.0, 0.1, 0.2, 0.3];
    let path = cells(&crowded(&CROWD))
        .unwrap()
        .solve(&load(power_law, &forces, &shanks));
    let turned = |values: [f64; 4]| [values[2], values[0], values[3], values[1]];
    let places = [CROWD[2], CROWD[0], CROWD[3], CROWD[1]];
    let other =
        cells(&crowded(&places))
            .unwrap()
            .solve(&load(power_law, &turned(forces), &turned(shanks)));
    assert_same(&path, &other, 1e-10);
}

/// A constant that hides a unit breaks this: N, W and K kept, lengths in millimetres.
#[test]
fn physics_does_not_know_which_units_it_is_in() {
    const MM: f64 = 1e3;
    let metre = crowded(&CROWD);
    let mut plan = metre.clone();
    plan.outlines = [
        (Outline::Rectangle { size: [50.0, 40.0] }, [0.0; 2]),
        (Outline::Disc { radius: 50.0 }, [20.0, 25.0]),
    ];
    plan.thickness = [4.0, 9.0];
    plan.sink = Sink::Film(800.0 / MM / MM);
    for site in &mut plan.sites {
        site.at = site.at.map(|x| x * MM);
        site.hole_radius = [2.25; 2];
        let pair = pair([2.25, 4.0], f64::INFINITY, [4.0, 9.0]);
        site.cone = cone(&pair, ConeRule::Fitted, ConeShape::Fitted);
    }
    let forces = [3000.0; 4];
    let one = cells(&metre)
        .unwrap()
        .solve(&load(power_law, &forces, &[0.2; 4]));
    let other = cells(&plan).unwrap().solve(&Load {
        conductance: |pressure: f64| power_law(pressure * MM * MM) / MM / MM,
        conductivity: [167.0 / MM; 2],
        forces: &forces,
        shanks: &[0.2; 4],
    });
    assert_same(&one, &other, 1e-9);
}

#[test]
fn round_joint_lies_between_its_bounds_with_and_without_shank() {
    let cells = cells(&round(DEFAULT_RINGS)).unwrap();
    let bare = cells.solve(&load(power_law, &[2000.0], &[0.0]));
    assert_eq!(bare.resistance_upper, Some(bare.source_to_sink));
    assert!(bare.resistance_lower < bare.source_to_sink);
    let bolted = cells.solve(&load(power_law, &[2000.0], &[2.0]));
    assert_eq!(bolted.resistance_upper, bare.resistance_upper);
    assert!(bolted.resistance_lower < bolted.source_to_sink);
    assert!(bolted.source_to_sink < bare.source_to_sink);
    let beside = bare.resistance_lower.recip() + 2.0;
    assert!((bolted.resistance_lower * beside - 1.0).abs() < 1e-12);
    // The shank is no part of the faying faces.
    assert!((bolted.contact / bare.contact - 1.0).abs() < 1e-14);
}

#[test]
fn uniform_conductance_over_equal_plates_is_a_slab() {
    let mut plan = case_i();
    plan.source.zone = Zone::Face;
    let path = cells(&plan)
        .unwrap()
        .solve(&load(|_| 1000.0, &[5000.0; 4], &[0.0; 4]));
    let area = 0.08 * 0.08 - 4.0 * PI * 2.75e-3_f64.powi(2);
    let plates = 2.0 * 5e-3 / 167.0 / area;
    // Rounding of a hundred rings.
    assert!((path.contact / (1000.0 * area) - 1.0).abs() < 1e-10);
    assert!((path.source_to_sink / (plates + 1.0 / (1000.0 * area)) - 1.0).abs() < 1e-9);
    assert!((path.perfect_contact / plates - 1.0).abs() < 1e-8);
    assert!((path.interface_drop * 1000.0 * area - 1.0).abs() < 1e-9);
    assert!((path.resistance_lower / path.source_to_sink - 1.0).abs() < 1e-9);
    assert!((path.coolant_drop.unwrap() * 2000.0 * area - 1.0).abs() < 1e-12);
}

#[test]
fn no_contact_and_no_gas_is_an_infinite_resistance() {
    let path = cells(&round(DEFAULT_RINGS))
        .unwrap()
        .solve(&load(power_law, &[0.0], &[0.0]));
    assert!(path.source_to_sink.is_infinite());
    assert!(path.contact.abs() < f64::MIN_POSITIVE);
}

#[test]
fn point_pressures_agree_with_the_rings() {
    let cells = cells(&round(DEFAULT_RINGS)).unwrap();
    assert_eq!(cells.pressure_at([1e-3, 0.0], &[2000.0]), None);
    assert_eq!(cells.pressure_at([0.031, 0.0], &[2000.0]), None);
    assert_eq!(cells.pressure_at([0.02, 0.0], &[2000.0]), Some(0.0));
    let rows = cells.rings(&load(power_law, &[2000.0], &[0.0]), 0);
    let row = rows[20];
    let at = 0.5 * (row.radius[0] + row.radius[1]);
    let point = cells.pressure_at([0.0, at], &[2000.0]).unwrap();
    // A ring of 0.1 mm: its mean and its middle differ by curvature only.
    assert!((point / row.pressure - 1.0).abs() < 1e-3);
    let path = cells.solve(&load(power_law, &[2000.0], &[0.0]));
    assert!((rows.last().unwrap().cumulative / path.contact - 1.0).abs() < 1e-12);
    let cone = cells.plan.sites[0].cone;
    let radius = cells.radius_holding(0.95, &[2000.0]);
    assert!((radius / cone.radius_holding(0.95) - 1.0).abs() < 1e-3);
    let area = PI * (cone.contact_radius.powi(2) - cone.hole_radius.powi(2));
    assert!((cells.contact_area() / area - 1.0).abs() < 1e-12);
}

#[test]
fn a_contact_over_the_edge_is_told_and_still_carries_its_force() {
    let near_the_edge = [[0.005, 0.02], [0.03, 0.02]];
    let cells = cells(&crowded(&near_the_edge)).unwrap();
    assert!(cells.cut_share[0] > 1e-4 && cells.cut_share[0] < 0.1);
    assert!(cells.cut_share[1].abs() < f64::MIN_POSITIVE);
    assert_eq!(cells.overlaps, [false, false]);
    assert!((cells.force_carried(&[3000.0, 1000.0]) / 4000.0 - 1.0).abs() < 1e-12);
}

#[test]
fn a_hole_without_a_bolt_bears_no_pressure() {
    let mut plan = crowded(&[[0.02, 0.02]]);
    plan.empty = vec![Hole {
        at: [0.026, 0.02],
        radius: [1e-3, 2e-3],
    }];
    let cells = cells(&plan).unwrap();
    let at = |x: f64| cells.pressure_at([x, 0.02], &[3000.0]);
    // The larger of both holes counts, up to its edge.
    for x in [0.0241, 0.026, 0.0279] {
        assert_eq!(at(x), None, "{x}");
    }
    for x in [0.0239, 0.0281] {
        assert!(at(x).unwrap() >= 0.0, "{x}");
    }
    assert!(at(0.0239).unwrap() > 0.0);
    let holes = PI * (2.25e-3_f64.powi(2) + 4e-6);
    assert!((cells.interface_area / (0.05 * 0.04 - holes) - 1.0).abs() < 1e-12);
}

#[test]
fn pressure_is_highest_at_the_edge_of_a_hole() {
    let cells = cells(&crowded(&[[0.02, 0.02], [0.0265, 0.021]])).unwrap();
    let forces = [3000.0, 5000.0];
    let peak = cells.peak_pressure(&forces);
    // Towards the first bolt, whose contact reaches here, the hole of the second is pressed hardest.
    let to = [-6.5, -1.0].map(|part: f64| part / 43.25_f64.sqrt());
    let edge = [0, 1].map(|axis| [0.0265, 0.021][axis] + to[axis] * 2.25e-3 * (1.0 + 1e-9));
    let there = cells.pressure_at(edge, &forces).unwrap();
    // Places stand 15 degrees apart, the nearest one 6.3 from this.
    assert!(there > peak && there < 1.02 * peak, "{there} {peak}");
    for row in 0..80 {
        for column in 0..100 {
            let point = [f64::from(column), f64::from(row)].map(|line| (line + 0.5) * 5.0 * STEP);
            assert!(cells.pressure_at(point, &forces).unwrap_or(0.0) <= there);
        }
    }
}

#[test]
fn an_isothermal_slab_tells_its_drop_per_watt() {
    let mut plan = case_i();
    plan.source = Source {
        zone: Zone::Face,
        isothermal: true,
    };
    let path = cells(&plan)
        .unwrap()
        .solve(&load(|_| 1000.0, &[5000.0; 4], &[0.0; 4]));
    let area = 0.08 * 0.08 - 4.0 * PI * 2.75e-3_f64.powi(2);
    let plates = 2.0 * 5e-3 / 167.0 / area;
    let between = 1.0 / (1000.0 * area);
    // Rounding of a hundred rings.
    assert!((path.source_to_sink / (plates + between) - 1.0).abs() < 1e-9);
    assert!((path.interface_drop / between - 1.0).abs() < 1e-9);
    assert!((path.node_to_node / (0.5 * plates + between) - 1.0).abs() < 1e-9);
}

#[test]
fn rings_begin_at_the_smaller_of_two_holes() {
    let mut plan = round(DEFAULT_RINGS);
    plan.sites[0].hole_radius = [3.125e-3, 2e-3];
    let cells = cells(&plan).unwrap();
    let edges = &cells.fine[0].edges;
    assert!((edges[0] - 2e-3).abs() < 1e-15, "{}", edges[0]);
    assert!(edges.windows(2).all(|pair| pair[0] < pair[1]));
    for (plate, hole) in [3.125e-3, 2e-3].into_iter().enumerate() {
        let areas = &cells.fine[0].rings.columns.plate_area[plate];
        let rings: f64 = areas.iter().sum();
        let exact = PI * (0.03_f64.powi(2) - f64::powi(hole, 2));
        assert!((rings / exact - 1.0).abs() < 1e-9, "{plate}");
    }
    // Heat spreads into the plate below the larger hole, which helps it.
    let wide = round(DEFAULT_RINGS);
    let load = load(power_law, &[2000.0], &[0.0]);
    let [wide, narrow] = [&wide, &plan].map(|plan| super::cells(plan).unwrap().solve(&load));
    assert!(narrow.perfect_contact < wide.perfect_contact);
}

const STEP: f64 = 0.1e-3;

proptest! {
    #![proptest_config(crate::fixed_cases(24))]

    #[test]
    fn pressure_carries_the_force_whatever_the_edges(
        x in 0.004..0.016_f64,
        y in 0.004..0.036_f64,
        pitch in 0.009..0.025_f64,
        forces in (500.0..8000.0_f64, 500.0..8000.0_f64),
    ) {
        let places = [[x, y], [x + pitch, y]];
        let forces = [forces.0, forces.1];
        let cells = cells(&crowded(&places)).unwrap();
        let carried = cells.force_carried(&forces);
        prop_assert!((carried / (forces[0] + forces[1]) - 1.0).abs() < 1e-12);
        // Points on a fine grid know nothing of cells, rings and patches.
        let mut counted = 0.0;
        for row in 0..400 {
            for column in 0..500 {
                let point = [(f64::from(column) + 0.5) * STEP, (f64::from(row) + 0.5) * STEP];
                counted += cells.pressure_at(point, &forces).unwrap_or(0.0) * STEP * STEP;
            }
        }
        // Holes of 2.25 mm radius, where pressure is highest, on a grid of 0.1 mm.
        prop_assert!((counted / carried - 1.0).abs() < 1e-2, "{counted} of {carried}");
    }
}
