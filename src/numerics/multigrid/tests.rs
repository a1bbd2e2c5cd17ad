//! Tests of the cycle: a symmetric guide that brings every equation home in few iterations.

use crate::numerics::{
    columns::{Disc, Layer, Operator, Plan, Region, Solid, Tie, lumped},
    multigrid::{Coarsening, Effort, Factor, Multigrid, Solved, conjugate_gradients},
};

/// Two plates with a hole, tied over part of the face, on weak springs.
fn clamped(parts: usize, stiffness: f64) -> (Operator<Solid>, Vec<f64>) {
    let line = |n: usize| -> Vec<f64> {
        // Uneven on purpose.
        (0..=n)
            .map(|k| 20.0 * (k as f64 / n as f64).powf(1.3))
            .collect()
    };
    let plan = Plan::new(line(parts), line(parts + 3));
    let hole = Disc {
        centre: [5.0, 6.0],
        radius: 1.5,
    };
    let holed = Region::sample(&plan, &|_| true).without(&Region::discs(&plan, &[hole]));
    let shares = holed.shares();
    let mut operator = Operator::new(&plan, &[9, 12]);
    for (group, degree) in [(0, 2), (1, 3)] {
        operator.add_layer(&Layer {
            shares: &shares,
            group,
            first_node: 0,
            heights: &[2.0],
            degree,
            constants: Solid {
                first: 1.0,
                shear: 0.5,
                ground: [1e-7; 2],
            },
        });
    }
    let near = Disc {
        centre: [5.0, 6.0],
        radius: 5.0,
    };
    let touching = holed.and(&Region::discs(&plan, &[near])).weights(&plan);
    let weights: Vec<f64> = touching.iter().map(|w| stiffness * w).collect();
    operator.add_tie(Tie {
        plus: operator.unknown(0, 2, 0),
        minus: Some(operator.unknown(1, 2, 3)),
        stencil: lumped(&weights),
    });
    let mut load = operator.zeros();
    for (column, weight) in touching.iter().enumerate() {
        load[operator.place(column, operator.unknown(0, 2, 2))] = -weight;
        load[operator.place(column, operator.unknown(1, 2, 0))] = *weight;
    }
    (operator, load)
}

const COARSENING: Coarsening = Coarsening {
    widest: 6.0,
    cheap: 1e4,
    dearest: 1e9,
};

fn solved(operator: &Operator<Solid>, load: &[f64]) -> (Solved, Vec<f64>) {
    let mut multigrid = Multigrid::new(operator, COARSENING).unwrap();
    let mut x = operator.zeros();
    let effort = Effort {
        tolerance: 1e-10,
        energy: None,
        ..Effort::default()
    };
    let solved = conjugate_gradients(operator, &mut multigrid, (load, &mut x), &effort).unwrap();
    (solved, x)
}

#[test]
fn few_iterations_whatever_the_grid_and_the_stiffness() {
    for parts in [12, 30] {
        for stiffness in [1.0, 30.0, 1e3] {
            let (operator, load) = clamped(parts, stiffness);
            let (solved, x) = solved(&operator, &load);
            let mut image = operator.zeros();
            operator.product(&x, &mut image);
            for (image, load) in image.iter_mut().zip(&load) {
                *image -= load;
            }
            let left = operator.dot(&image, &image) / operator.dot(&load, &load);
            assert!(left.sqrt() < 2e-10);
            // Measured 19 to 32 for ten digits.
            assert!(
                solved.iterations < 40,
                "{parts} {stiffness} {}",
                solved.iterations
            );
        }
    }
}

// Single precision: 1e-5 of the product of the lengths.
#[test]
fn the_cycle_is_symmetric_and_positive() {
    let (operator, _) = clamped(14, 30.0);
    let mut multigrid = Multigrid::new(&operator, COARSENING).unwrap();
    assert!(multigrid.columns().len() > 2, "{:?}", multigrid.columns());
    let vector = |seed: usize| -> Vec<f64> {
        let mut vector = operator.zeros();
        for column in 0..operator.plan().columns() {
            for unknown in 0..21 {
                let at = column * 21 + unknown + seed;
                vector[operator.place(column, unknown)] = ((at * at) % 17) as f64 - 8.0;
            }
        }
        vector
    };
    let (a, b) = (vector(1), vector(5));
    let (mut of_a, mut of_b) = (operator.zeros(), operator.zeros());
    multigrid.cycle(&a, &mut of_a);
    multigrid.cycle(&b, &mut of_b);
    let (left, right) = (operator.dot(&b, &of_a), operator.dot(&a, &of_b));
    let size = (operator.dot(&a, &of_a) * operator.dot(&b, &of_b)).sqrt();
    assert!(operator.dot(&a, &of_a) > 0.0);
    assert!((left - right).abs() < 1e-5 * size, "{left} {right} {size}");
}

#[test]
fn a_single_level_is_solved_at_once() {
    let (operator, load) = clamped(5, 10.0);
    let whole = Coarsening {
        cheap: f64::INFINITY,
        ..COARSENING
    };
    let mut multigrid = Multigrid::new(&operator, whole).unwrap();
    let mut x = operator.zeros();
    let effort = Effort {
        tolerance: 1e-9,
        energy: None,
        ..Effort::default()
    };
    let solved = conjugate_gradients(&operator, &mut multigrid, (&load, &mut x), &effort).unwrap();
    assert!(solved.iterations <= 2, "{}", solved.iterations);
}

#[test]
fn renewed_ties_are_as_good_as_new_ones() {
    let (mut operator, load) = clamped(14, 30.0);
    let mut multigrid = Multigrid::new(&operator, COARSENING).unwrap();
    let slack: Vec<f64> = (0..operator.plan().columns())
        .map(|c| if c % 3 == 0 { 4.0 } else { 0.0 })
        .collect();
    operator.set_tie(0, &slack);
    multigrid.renew(&operator, Factor::Renewed).unwrap();
    let mut fresh = Multigrid::new(&operator, COARSENING).unwrap();
    let (mut one, mut other) = (operator.zeros(), operator.zeros());
    multigrid.cycle(&load, &mut one);
    fresh.cycle(&load, &mut other);
    assert!(one == other);
}

#[test]
fn threads_do_not_change_a_bit() {
    let (operator, load) = clamped(24, 30.0);
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(threads)
            .build()
            .unwrap();
        pool.install(|| solved(&operator, &load).1)
    };
    assert!(on(1) == on(2));
}

#[test]
fn what_is_no_number_is_refused() {
    let (operator, mut load) = clamped(8, 30.0);
    load[0] = f64::NAN;
    let mut multigrid = Multigrid::new(&operator, COARSENING).unwrap();
    let mut x = operator.zeros();
    let failed = conjugate_gradients(
        &operator,
        &mut multigrid,
        (&load, &mut x),
        &Effort::default(),
    );
    assert!(failed.is_err());
}
