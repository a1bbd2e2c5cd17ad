//! Tests of the matrices over columns: rigid motion, exact fields, conduction through a slab.

use std::f64::consts::PI;

use nalgebra::DMatrix;

use crate::numerics::{
    columns::{
        Disc, Fine, Layer, Operator, Plan, Region, Scalar, Solid, Stop, Tie, lines, lumped, mass,
        node_heights,
    },
    multigrid::{Coarsening, Effort, Multigrid, conjugate_gradients},
};

fn even(length: f64, parts: usize) -> Vec<f64> {
    (0..=parts)
        .map(|k| length * k as f64 / parts as f64)
        .collect()
}

fn graded_plan() -> Plan {
    Plan::new(vec![0.0, 0.5, 1.3, 1.9, 3.0], vec![0.0, 0.9, 1.4, 2.5])
}

fn single_cell() -> Plan {
    Plan::new(vec![0.0, 0.5], vec![0.0, 0.9])
}

fn with_hole(plan: &Plan) -> Region {
    let hole = Disc {
        centre: [1.2, 1.1],
        radius: 0.7,
    };
    Region::sample(plan, &|_| true).without(&Region::discs(plan, &[hole]))
}

const STEEL: Solid = Solid {
    first: 1.2,
    shear: 0.8,
    ground: [0.0; 2],
};

fn plate(plan: &Plan, shares: &[f64], degree: usize) -> Operator<Solid> {
    let mut operator = Operator::new(plan, &[3 * (degree + 1)]);
    operator.add_layer(&Layer {
        shares,
        group: 0,
        first_node: 0,
        heights: &[0.8],
        degree,
        constants: STEEL,
    });
    operator
}

/// The matrix entry by entry, padding left out.
fn dense(operator: &Operator<Solid>) -> DMatrix<f64> {
    let stride = operator.place(1, 0);
    let block = operator.unknowns() / operator.plan().columns();
    let places: Vec<usize> = (0..operator.plan().columns())
        .flat_map(|column| (0..block).map(move |unknown| column * stride + unknown))
        .collect();
    let mut matrix = DMatrix::zeros(places.len(), places.len());
    for (at, place) in places.iter().enumerate() {
        let (mut unit, mut image) = (operator.zeros(), operator.zeros());
        unit[*place] = 1.0;
        operator.product(&unit, &mut image);
        for (row, place) in places.iter().enumerate() {
            matrix[(row, at)] = image[*place];
        }
    }
    matrix
}

// 1e-12 of the largest eigenvalue is rounding; the next one above is 1e-4 of it.
#[test]
fn a_free_plate_has_six_rigid_motions_and_no_other() {
    for degree in [1, 2, 3] {
        for (hole, plan) in [
            (false, graded_plan()),
            (true, graded_plan()),
            (false, single_cell()),
        ] {
            let shares = if hole {
                with_hole(&plan).shares()
            } else {
                vec![1.0; plan.cells()]
            };
            let matrix = dense(&plate(&plan, &shares, degree));
            assert!((&matrix - matrix.transpose()).amax() < 1e-14);
            let mut values: Vec<f64> = matrix.symmetric_eigenvalues().iter().copied().collect();
            values.sort_by(f64::total_cmp);
            let largest = values[values.len() - 1];
            assert!(values[0] > -1e-13 * largest);
            assert!(
                values[5] < 1e-12 * largest,
                "{degree} {hole} {:e}",
                values[5] / largest
            );
            assert!(
                values[6] > 1e-7 * largest,
                "{degree} {hole} {:e}",
                values[6] / largest
            );
        }
    }
}

// Strain energy of a linear field is exact; 1e-12 is rounding of some thousand terms.
#[test]
fn a_linear_field_has_its_exact_energy() {
    let plan = graded_plan();
    let cover = with_hole(&plan);
    let shares = crate::numerics::columns::with_floor(&plan, &cover.shares());
    let volume: f64 = (0..plan.cells())
        .map(|cell| shares[cell] * plan.cell_area(cell) * 0.8)
        .sum();
    let gradient = [[0.3, -0.2, 0.5], [0.1, 0.7, -0.4], [0.6, 0.2, -0.9]];
    for degree in [1, 2, 3] {
        let operator = plate(&plan, &cover.shares(), degree);
        let heights = node_heights(&[0.8], degree);
        let mut field = operator.zeros();
        for column in 0..plan.columns() {
            let [x, y] = plan.place(column);
            for (node, z) in heights.iter().enumerate() {
                for (component, row) in gradient.iter().enumerate() {
                    let at = operator.place(column, operator.unknown(0, component, node));
                    field[at] = row[0] * x + row[1] * y + row[2] * z;
                }
            }
        }
        let mut image = operator.zeros();
        operator.product(&field, &mut image);
        let energy = 0.5 * operator.dot(&field, &image);
        let trace: f64 = (0..3).map(|i| gradient[i][i]).sum();
        let strain = |i: usize, j: usize| 0.5 * (gradient[i][j] + gradient[j][i]);
        let square: f64 = (0..9).map(|at| strain(at / 3, at % 3).powi(2)).sum();
        let exact = volume * (0.5 * STEEL.first * trace * trace + STEEL.shear * square);
        assert!(
            (energy / exact - 1.0).abs() < 1e-12,
            "{degree} {energy} {exact}"
        );
    }
}

/// Two plates of unlike conductivity with a hole, resistance between them and a film below.
#[test]
fn a_slab_with_a_hole_adds_its_resistances() {
    let plan = graded_plan();
    // The hole is one cell: there the shares are all or nothing and the field is exactly linear.
    let cover = Region::sample(&plan, &|[x, y]| {
        !(0.5..1.3).contains(&x) || !(0.9..1.4).contains(&y)
    });
    let (shares, weights) = (cover.shares(), cover.weights(&plan));
    let (thickness, conductivity) = ([0.8, 0.5], [3.0, 7.0]);
    let (between, film) = (2.5, 1.7);
    let mut operator = Operator::<Scalar>::new(&plan, &[3, 4]);
    for group in 0..2 {
        operator.add_layer(&Layer {
            shares: &shares,
            group,
            first_node: 0,
            heights: &[thickness[group]],
            degree: group + 2,
            constants: Scalar {
                along: [conductivity[group], 2.0],
                through: conductivity[group],
            },
        });
    }
    let strengths: Vec<f64> = weights.iter().map(|w| between * w).collect();
    operator.add_tie(Tie {
        plus: operator.unknown(0, 0, 0),
        minus: Some(operator.unknown(1, 0, 3)),
        stencil: lumped(&strengths),
    });
    let strengths: Vec<f64> = weights.iter().map(|w| film * w).collect();
    operator.add_tie(Tie {
        plus: operator.unknown(1, 0, 0),
        minus: None,
        stencil: lumped(&strengths),
    });
    let mut load = operator.zeros();
    for (column, weight) in weights.iter().enumerate() {
        load[operator.place(column, operator.unknown(0, 0, 2))] = *weight;
    }
    let mut multigrid = Multigrid::new(&operator, Coarsening::FULL).unwrap();
    let mut rise = operator.zeros();
    let effort = Effort {
        tolerance: 1e-14,
        energy: None,
        ..Effort::default()
    };
    conjugate_gradients(&operator, &mut multigrid, (&load, &mut rise), &effort).unwrap();
    let wanted = thickness[0] / conductivity[0]
        + thickness[1] / conductivity[1]
        + 1.0 / between
        + 1.0 / film;
    for (column, weight) in weights.iter().enumerate() {
        if *weight > 0.0 {
            let found = rise[operator.place(column, operator.unknown(0, 0, 2))];
            // 1e-12: the field is linear, so that only rounding and the last residual are left.
            assert!((found / wanted - 1.0).abs() < 1e-12, "{found} {wanted}");
        }
    }
    let taken: f64 = weights
        .iter()
        .enumerate()
        .map(|(column, w)| film * w * rise[operator.place(column, operator.unknown(1, 0, 0))])
        .sum();
    // 1e-12: source equals sink.
    assert!((taken / weights.iter().sum::<f64>() - 1.0).abs() < 1e-12);
}

/// Largest error of T = cos(πx/L) cosh(πz/L) on `parts` cells, heat entering at the top.
fn manufactured_error(parts: usize, degree: usize) -> f64 {
    let (length, height) = (1.0, 0.6);
    let plan = Plan::new(even(length, parts), even(0.5, 2));
    let shares = vec![1.0; plan.cells()];
    let mut operator = Operator::<Scalar>::new(&plan, &[2 * degree + 1]);
    operator.add_layer(&Layer {
        shares: &shares,
        group: 0,
        first_node: 0,
        heights: &[0.5 * height; 2],
        degree,
        constants: Scalar {
            along: [1.0; 2],
            through: 1.0,
        },
    });
    let wave = PI / length;
    let top = operator.unknown(0, 0, 2 * degree);
    let exact = |x: f64, z: f64| (wave * x).cos() * (wave * z).cosh();
    // A stiff film on the top face holds the exact value there.
    let film = 1e9;
    let rows = mass(&plan, &shares);
    let mut load = operator.zeros();
    for column in 0..plan.columns() {
        for (neighbour, value) in rows[column].iter().enumerate() {
            if *value != 0.0 {
                let other =
                    column + (neighbour / 3) * plan.y.len() + neighbour % 3 - plan.y.len() - 1;
                load[operator.place(column, top)] +=
                    film * value * exact(plan.place(other)[0], height);
            }
        }
    }
    operator.add_tie(Tie {
        plus: top,
        minus: None,
        stencil: rows.iter().map(|row| row.map(|m| film * m)).collect(),
    });
    let mut multigrid = Multigrid::new(&operator, Coarsening::FULL).unwrap();
    let mut found = operator.zeros();
    let effort = Effort {
        tolerance: 1e-13,
        energy: None,
        ..Effort::default()
    };
    conjugate_gradients(&operator, &mut multigrid, (&load, &mut found), &effort).unwrap();
    let heights = node_heights(&[0.5 * height; 2], degree);
    let mut worst = 0.0_f64;
    for column in 0..plan.columns() {
        for (node, z) in heights.iter().enumerate() {
            let miss = found[operator.place(column, operator.unknown(0, 0, node))]
                - exact(plan.place(column)[0], *z);
            worst = worst.max(miss.abs());
        }
    }
    worst
}

// Bilinear in the plan: halving the cells quarters the error (measured 3.95); cubic through the height, so
// that the plan's error stands alone.
#[test]
fn conduction_converges_with_the_square_of_the_cells() {
    let (coarse, fine) = (manufactured_error(8, 3), manufactured_error(16, 3));
    assert!(coarse < 2e-2, "{coarse}");
    let ratio = coarse / fine;
    assert!(ratio > 3.6 && ratio < 4.4, "{coarse} {fine}");
}

#[test]
fn lines_keep_stops_and_leave_no_sliver() {
    let stop = |at: f64, rank: u8| Stop { at, rank };
    let stops = [
        stop(0.0, 0),
        stop(10.0, 0),
        stop(5.0, 2),
        stop(5.1, 1),
        stop(9.9, 1),
    ];
    let fine = [Fine {
        at: 5.0,
        reach: 1.0,
        spacing: 0.5,
    }];
    let found = lines(&stops, &fine, 0.25, 2.0);
    assert!((found[0], found[found.len() - 1]) == (0.0, 10.0));
    // The edge of rank 1 wins over the axis of rank 2 beside it; the one near the end yields.
    assert!(found.contains(&5.1) && !found.contains(&5.0) && !found.contains(&9.9));
    for pair in found.windows(2) {
        let step = pair[1] - pair[0];
        let middle = 0.5 * (pair[0] + pair[1]);
        let wanted = (0.5 + 0.25 * ((middle - 5.0).abs() - 1.0).max(0.0)).min(2.0);
        assert!(
            step > 0.4 * wanted && step < 1.3 * wanted,
            "{step} {wanted}"
        );
    }
    assert!(lines(&[stop(1.0, 0); 3], &fine, 0.25, 2.0).is_empty());
    assert!(lines(&[stop(f64::NAN, 0), stop(1.0, 0)], &fine, 0.25, 2.0).is_empty());
}

#[test]
fn regions_weigh_what_they_cover() {
    let plan = graded_plan();
    let whole = Region::sample(&plan, &|_| true);
    assert!((whole.area(&plan) - 7.5).abs() < 1e-12);
    let holed = with_hole(&plan);
    let weights: f64 = holed.weights(&plan).iter().sum();
    assert!((weights - holed.area(&plan)).abs() < 1e-12);
    // 2 %: sixteen samples along cells of the hole's own size.
    let hole = whole.without(&holed).area(&plan);
    assert!((hole / (PI * 0.49) - 1.0).abs() < 0.02);
    assert!(holed.holds(&plan, [2.8, 0.1]) && !holed.holds(&plan, [1.2, 1.1]));
    assert!(!holed.holds(&plan, [3.1, 0.1]));
    let mut seen = 0.0;
    for cell in 0..plan.cells() {
        holed.each_sample(&plan, cell, |_, area| seen += area);
    }
    assert!((seen - holed.area(&plan)).abs() < 1e-12);
    // Straight edges between lines: the first moment follows from the area's middle.
    let strip = Region::sample(&plan, &|[x, _]| x < 0.25);
    let moment: f64 = strip
        .weights(&plan)
        .iter()
        .enumerate()
        .map(|(column, w)| w * plan.place(column)[0])
        .sum();
    assert!((moment - 0.25 * 2.5 * 0.125).abs() < 1e-12);
}
