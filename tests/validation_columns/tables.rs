//! The table of fields over the force that bent faces need.

use std::sync::Arc;

use ringsum::pressure::elastic::{Field, Fineness, Table};

use crate::joints::{Plates, crossings};

/// Two bolts that pull a bow of 40 µm shut.
fn bent(factor: f64) -> Plates {
    Plates {
        bow: 40e-6,
        forces: vec![2500.0 * factor; 2],
        fineness: Fineness::Coarse,
        ..Plates::pair(
            [0.06, 0.03],
            [0.004, 0.004],
            crossings(&[0.01, 0.05], &[0.015]),
        )
    }
}

fn solve(factor: f64) -> Result<Arc<Field>, ringsum::pressure::elastic::Failure> {
    bent(factor).try_field().map(Arc::new)
}

#[test]
fn a_table_over_force_errs_as_it_says() {
    let table = Table::over([0.3, 2.0], 0.01, &solve).expect("a table");
    assert!(
        table.error > 1e-6 && table.len() >= 3,
        "{} of {}",
        table.error,
        table.len()
    );
    for factor in [0.3, 0.47, 0.9, 1.6, 2.0] {
        let told = table.at(factor).expect("inside the range");
        let solved = solve(factor).expect("a field");
        for (told, solved) in [
            (told.gap_mean(), solved.gap_mean()),
            (told.mean_force_radius(), solved.mean_force_radius()),
        ] {
            // What the table says of the middles of its intervals; nodes are met but for the last
            // step of the solver.
            let off = (told / solved - 1.0).abs();
            assert!(
                off <= table.error + 1e-5,
                "{off} at {factor}, {} told",
                table.error
            );
        }
        // Straight between two fields of given force is straight in the force.
        assert!((told.force() / (5000.0 * factor) - 1.0).abs() < 1e-5);
    }
    assert!(table.at(0.29).is_none() && table.at(2.1).is_none());
    // A bow does not scale: half of the field at 2 is not the field at 1.
    let scaled = table.at(2.0).expect("the end").scaled(0.5).gap_mean();
    let solved = solve(1.0).expect("a field").gap_mean();
    assert!((scaled / solved - 1.0).abs() > 0.02, "{scaled} {solved}");
}

#[test]
fn a_table_without_a_range_is_refused() {
    for range in [
        [1.0, 1.0],
        [0.0, 1.0],
        [2.0, 1.0],
        [1.0, f64::INFINITY],
        [f64::NAN, 1.0],
    ] {
        assert!(Table::over(range, 0.01, &solve).is_err(), "{range:?}");
    }
}
