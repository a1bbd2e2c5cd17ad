//! What must hold for any joint: balance, scaling, symmetry, independence of the start.

use ringsum::pressure::elastic::{
    Compliance, Failure, Field, Fineness, size, solve, solve_from, solve_from_set,
};

use crate::joints::{Plates, case_i, case_ii};

/// A joint with nothing symmetric about it, small enough to be quick; the coarsest level is solved
/// less closely than the laws are held here.
fn uneven() -> Plates {
    Plates {
        fineness: Fineness::Fast,
        forces: vec![5000.0, 3000.0, 4100.0],
        youngs_modulus: vec![70e9, 200e9],
        ..Plates::pair(
            [0.06, 0.05],
            [0.004, 0.006],
            vec![[0.011, 0.012], [0.045, 0.013], [0.027, 0.038]],
        )
    }
}

#[test]
fn forces_balance_and_contact_is_complementary() {
    for bow in [0.0, 40e-6, -40e-6] {
        let plates = Plates { bow, ..uneven() };
        let field = plates.field();
        let health = &field.health;
        // 1e-6: the last linear solution stops at 1e-7 of the load.
        assert!(health.force_balance.abs() < 1e-6, "{health:?}");
        assert!(health.complementarity == 0.0, "{health:?}");
        // The energy may only rise by what an unfinished linear solution leaves.
        assert!(health.energy_rise < 1e-3, "{health:?}");
        let sum: f64 = (0..3).map(|bolt| field.force_of(bolt)).sum();
        assert!((sum / 12100.0 - 1.0).abs() < 1e-6);
        assert!((field.force() / 12100.0 - 1.0).abs() < 1e-6);
    }
}

// Doubling is exact in binary numbers, so that every step is the same but for the factor.
#[test]
fn twice_the_force_presses_twice_as_hard_on_the_same_columns() {
    let once = uneven();
    let twice = Plates {
        forces: once.forces.iter().map(|force| 2.0 * force).collect(),
        ..once.clone()
    };
    let (once, twice) = (once.field(), twice.field());
    let scaled = once.scaled(2.0);
    assert!(scaled.faces == twice.faces);
    assert!((scaled.force() / once.force() - 2.0).abs() < 1e-15);
}

/// Total readings, which no turning or mirroring may change.
fn readings(field: &Field) -> [f64; 5] {
    [
        field.gap_max(),
        field.gap_mean(),
        field.peak_pressure(),
        field.mean_force_radius(),
        field.contact_area(),
    ]
}

fn same(one: &Field, other: &Field, tolerance: f64) {
    for (a, b) in readings(one).into_iter().zip(readings(other)) {
        assert!((a / b - 1.0).abs() < tolerance, "{a} {b}");
    }
}

// 1e-5: residuals of 1e-7 of the load, left in another order of columns.
#[test]
fn a_mirrored_or_turned_joint_reads_the_same() {
    let plain = uneven();
    let mirrored = Plates {
        at: plain.at.iter().map(|[x, y]| [0.06 - x, *y]).collect(),
        ..plain.clone()
    };
    let turned = Plates {
        bounds: vec![[[0.0, 0.05], [0.0, 0.06]]; 2],
        at: plain.at.iter().map(|[x, y]| [0.05 - y, *x]).collect(),
        ..plain.clone()
    };
    let (plain, mirrored, turned) = (plain.field(), mirrored.field(), turned.field());
    same(&plain, &mirrored, 1e-5);
    same(&plain, &turned, 1e-5);
}

#[test]
fn a_symmetric_joint_has_a_symmetric_field() {
    let field = case_i(Fineness::Fast).field();
    let plan = &field.mesh.plan;
    let (nx, ny) = (plan.x.len(), plan.y.len());
    let largest = field.gap_max();
    for i in 0..nx {
        for j in 0..ny {
            let here = field.faces[0].gap[plan.column(i, j)];
            for (k, l) in [(nx - 1 - i, j), (i, ny - 1 - j), (j, i)] {
                let there = field.faces[0].gap[plan.column(k, l)];
                assert!((here - there).abs() < 1e-5 * largest, "{i} {j}");
            }
        }
    }
}

// The same joint in millimetres, newtons and megapascals; 1e-4: single precision rounds differently, so that
// the steps stop at other residuals; a hidden length or modulus would show as a factor.
#[test]
fn units_do_not_matter() {
    let soft = Compliance::Layer { stiffness: 1e14 };
    let metres = Plates {
        compliance: soft,
        ..uneven()
    };
    let scale = |value: f64| 1e3 * value;
    let millimetres = Plates {
        bounds: metres
            .bounds
            .iter()
            .map(|sides| sides.map(|side| side.map(scale)))
            .collect(),
        thickness: metres.thickness.iter().copied().map(scale).collect(),
        at: metres.at.iter().map(|at| at.map(scale)).collect(),
        hole: scale(metres.hole),
        bearing: scale(metres.bearing),
        youngs_modulus: metres.youngs_modulus.iter().map(|e| e * 1e-6).collect(),
        compliance: Compliance::Layer { stiffness: 1e5 },
        ..metres.clone()
    };
    let (metres, millimetres) = (metres.field(), millimetres.field());
    let factors = [1e3, 1e3, 1e-6, 1e3, 1e6];
    let pairs = readings(&metres).into_iter().zip(readings(&millimetres));
    for ((a, b), factor) in pairs.zip(factors) {
        assert!((a * factor / b - 1.0).abs() < 1e-4, "{a} {b}");
    }
}

// The same set from wherever the steps begin; pressures to the last residual.
#[test]
fn the_first_set_does_not_matter() {
    let plates = Plates {
        bow: 20e-6,
        ..uneven()
    };
    plates.posed(|problem| {
        let plain = solve(problem).unwrap();
        let whole = solve_from_set(problem, &|_| true).unwrap();
        let little = solve_from_set(problem, &|[x, y]| {
            plates
                .at
                .iter()
                .any(|at| (x - at[0]).hypot(y - at[1]) < 0.004)
        })
        .unwrap();
        let again = solve_from(problem, &plain).unwrap();
        let touches = |field: &Field| -> Vec<bool> {
            field.faces[0].pressure.iter().map(|p| *p > 0.0).collect()
        };
        for other in [&whole, &little, &again] {
            assert!(touches(&plain) == touches(other));
            same(&plain, other, 1e-5);
        }
        assert!(again.health.newton_steps <= 2, "{:?}", again.health);
    });
}

#[test]
fn another_force_starts_from_the_last_field() {
    let plates = Plates {
        bow: 20e-6,
        ..uneven()
    };
    let field = plates.field();
    let more = Plates {
        forces: vec![5200.0, 3300.0, 4000.0],
        ..plates
    };
    more.posed(|problem| {
        let fresh = solve(problem).unwrap();
        let started = solve_from(problem, &field).unwrap();
        same(&fresh, &started, 1e-5);
        assert!(started.health.cg_iterations <= fresh.health.cg_iterations);
    });
}

#[test]
fn threads_do_not_change_a_bit_of_the_field() {
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(threads)
            .build()
            .unwrap();
        pool.install(|| uneven().field())
    };
    assert!(on(1) == on(2));
}

// Flat joints: pressure is the force times a fixed field, so that no column loses any; bowed ones may.
#[test]
fn more_force_never_lowers_a_column_s_force_in_a_flat_joint() {
    let plain = uneven();
    let more = Plates {
        forces: plain.forces.iter().map(|force| 1.3 * force).collect(),
        ..plain.clone()
    };
    let (plain, more) = (plain.field(), more.field());
    let peak = plain.peak_pressure();
    let pairs = plain.faces[0].pressure.iter().zip(&more.faces[0].pressure);
    for (less, more) in pairs {
        assert!(*more >= less - 1e-5 * peak);
    }
}

// A layer of no stiffness lets the plates float: pressure spreads and touches everywhere.
#[test]
fn a_soft_layer_touches_everywhere() {
    let soft = |stiffness: f64| Plates {
        compliance: Compliance::Layer { stiffness },
        ..case_ii(Fineness::Coarse)
    };
    let field = soft(1e7).field();
    let plan = &field.mesh.plan;
    let face = &field.faces[0];
    for column in 0..plan.columns() {
        assert!(face.weight[column] == 0.0 || face.pressure[column] > 0.0);
    }
    let area: f64 = face.weight.iter().sum();
    let mean = field.force() / area;
    // So soft that the plates bend by hundredths of the closure.
    let spread = face.pressure.iter().fold(0.0_f64, |most, p| most.max(*p)) / mean;
    assert!(spread > 1.0 && spread < 1.1, "{spread}");
    assert!(field.health.newton_steps <= 5, "{:?}", field.health);
    // 10 MPa/mm still touches everywhere, unevenly.
    let firmer = soft(1e10).field();
    assert!(firmer.health.newton_steps <= 5, "{:?}", firmer.health);
    assert!(firmer.peak_pressure() > field.peak_pressure());
}

#[test]
fn too_large_a_grid_is_refused_before_it_is_made() {
    let plates = Plates {
        most_bytes: 20_000_000,
        fineness: Fineness::Fine,
        ..case_ii(Fineness::Fine)
    };
    let Err(Failure::TooLarge {
        unknowns,
        bytes,
        limit,
    }) = plates.try_field()
    else {
        panic!("a field came out");
    };
    let size = plates.posed(size).unwrap();
    assert!((unknowns, bytes) == (size.unknowns, size.bytes));
    assert!(bytes > limit && limit == 20_000_000);
}

#[test]
fn faulty_input_ends_in_a_failure() {
    let plain = uneven();
    let faulty = [
        Plates {
            forces: vec![f64::NAN; 3],
            ..plain.clone()
        },
        Plates {
            thickness: vec![0.004, 0.0],
            ..plain.clone()
        },
        Plates {
            bow: f64::INFINITY,
            ..plain.clone()
        },
        Plates {
            poisson: 0.5,
            ..plain.clone()
        },
        Plates {
            at: vec![[0.011, f64::NAN]; 3],
            ..plain.clone()
        },
        Plates {
            at: vec![[0.5, 0.5]; 3],
            ..plain.clone()
        },
        Plates {
            thread: Some(0.02),
            ..plain.clone()
        },
        Plates {
            bounds: vec![[[0.0, 0.06], [0.0, 0.05]], [[0.1, 0.2], [0.0, 0.05]]],
            ..plain.clone()
        },
        Plates {
            bounds: vec![[[0.0, f64::NAN], [0.0, 0.05]]; 2],
            ..plain.clone()
        },
        Plates {
            hole: 0.005,
            ..plain.clone()
        },
        Plates {
            compliance: Compliance::Layer { stiffness: 0.0 },
            ..plain
        },
    ];
    for (index, plates) in faulty.iter().enumerate() {
        assert!(plates.try_field().is_err(), "{index}");
    }
}
