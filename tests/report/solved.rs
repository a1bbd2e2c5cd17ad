//! What a solved heat, other media and a minimum of the torque add to the report.

use ringsum::units::System;
use ringsum::{
    estimate::{Band, Minimum, RingRow, Temperatures},
    figures::{self, Drawing},
    joint::{Limit, Medium},
    report::{
        json, media, sweep,
        text::{self, WIDTH},
    },
    uncertainty::InMedium,
};
use serde_json::{Value, json};

use crate::{band, estimate, has, torque_sweep};

#[test]
fn a_minimum_between_rows_is_told_with_its_value() {
    let mut swept = torque_sweep();
    swept.best = Some(1.2);
    swept.minimum = Some(Minimum {
        torque: 1.2,
        source_to_sink: 0.095,
        added_by_joint: 0.055,
    });
    let report = sweep::torque(&swept);
    for part in [
        "best     1.200 N·m: the minimum of source to sink, 0.09500 K/W, 14 % below the stated torque",
        "between the rows",
        // From 0.095 to 0.11 at the last torque that strength allows.
        "beyond 1.200 N·m: 16 % above the lowest at 1.600 N·m",
        "near best",
    ] {
        assert!(report.contains(part), "{part}: {report}");
    }
    assert!(report.lines().all(|line| line.chars().count() <= WIDTH));
    assert_eq!(
        json::torque(&swept)["minimum"],
        json!({ "torque": 1.2, "source_to_sink": 0.095, "added_by_joint": 0.055 })
    );
    assert_eq!(json::torque(&torque_sweep())["minimum"], Value::Null);
}

#[test]
fn the_limit_of_strength_itself_is_the_best_torque_where_more_is_better() {
    let mut swept = torque_sweep();
    swept.best = Some(1.9);
    swept.at_limit = Some(Minimum {
        torque: 1.9,
        source_to_sink: 0.099,
        added_by_joint: 0.055,
    });
    let report = sweep::torque(&swept);
    for part in [
        "best     1.900 N·m: lowest source to sink that strength allows here, 10 % below the stated",
        "it is the limit of strength itself",
        "near best",
    ] {
        assert!(report.contains(part), "{part}: {report}");
    }
    assert_eq!(json::torque(&swept)["at_limit"]["torque"], json!(1.9));
    // A torque is not set against itself.
    swept.best = Some(swept.stated);
    swept.at_limit = None;
    let report = sweep::torque(&swept);
    assert!(report.contains(", at the stated torque\n"), "{report}");
}

#[test]
fn where_separation_bounds_the_best_torque_it_is_named_and_not_strength() {
    let mut swept = torque_sweep();
    let least = 1.3;
    swept.window.limits[0].torque = least;
    swept.best = Some(least);
    swept.at_limit = Some(Minimum {
        torque: least,
        source_to_sink: 0.099,
        added_by_joint: 0.055,
    });
    for (required, extreme) in [(Limit::Most, "lowest"), (Limit::Least, "highest")] {
        swept.required = Some((0.115, required));
        let report = sweep::torque(&swept);
        let praise = format!("{extreme} source to sink that separation allows");
        assert!(report.contains(&praise), "{report}");
        assert!(
            report.contains(
                "it is the least torque that keeps the faces together; any less may part them\n"
            ),
            "{report}"
        );
        let drawing = Drawing::Torque(Box::new(swept.clone()));
        let svg = figures::svg(&drawing).expect("a drawing");
        assert!(svg.contains(&format!("{extreme} that separation allows")));
        assert!(!svg.contains("that strength allows"));
    }
}

#[test]
fn without_draws_nothing_is_said_of_low_and_high() {
    let said = "low and high hold for faces bent";
    let mut swept = torque_sweep();
    swept.bends = true;
    assert!(sweep::torque(&swept).contains(said));
    for point in &mut swept.points {
        for band in [
            &mut point.source_to_sink,
            &mut point.added_by_joint,
            &mut point.contact,
        ] {
            *band = Band::nominal(band.nominal);
        }
    }
    assert!(!sweep::torque(&swept).contains(said));
}

#[test]
fn the_best_torque_of_a_mount_is_that_of_most_resistance() {
    let mut mount = torque_sweep();
    mount.required = Some((0.09, Limit::Least));
    mount.best = Some(1.6);
    let report = sweep::torque(&mount);
    assert!(
        report.contains("1.600 N·m: highest source to sink"),
        "{report}"
    );
    assert!(!report.contains("lowest"), "{report}");
    mount.best = Some(1.0);
    let report = sweep::torque(&mount);
    assert!(
        report.contains("first torque swept: less resists more"),
        "{report}"
    );
    // A best torque at the first step says that the range may end too early.
    let report = sweep::torque(&torque_sweep());
    assert!(
        report.contains("first torque swept: the minimum may lie below"),
        "{report}"
    );
    assert!(report.lines().all(|line| line.chars().count() <= WIDTH));
}

fn temperatures() -> Temperatures {
    Temperatures {
        hottest: 0.3,
        hottest_at: [0.04, 0.0205, 0.005],
        names: vec!["base".to_owned(), "panel".to_owned()],
        plate_means: vec![0.2, 0.05],
        interface_drops: vec![0.11],
    }
}

#[test]
fn a_solved_heat_says_where_it_is_hottest_and_how_warm_the_plates_are() {
    let mut solved = estimate();
    assert_eq!(json::estimate(&solved)["temperatures"], Value::Null);
    assert!(!text::estimate(&solved).contains("hottest point at"));
    solved.cases[0].temperatures = Some(temperatures());
    let report = text::estimate(&solved);
    // 22 W times the values per watt.
    for part in [
        "hottest point at x 40, y 21 mm of base, 5 mm above its lowest face",
        "base 4.400 K",
        "panel 1.100 K",
    ] {
        assert!(
            report.replace("\n  ", " ").contains(part),
            "{part}: {report}"
        );
    }
    assert_eq!(
        json::estimate(&solved)["temperatures"],
        json!({
            "hottest": { "plate": "base", "at": [0.04, 0.0205], "height": 0.005, "per_watt": 0.3 },
            "plates": [
                { "plate": "base", "mean_per_watt": 0.2 },
                { "plate": "panel", "mean_per_watt": 0.05 },
            ],
            "interface_drops_per_watt": [0.11],
        })
    );
    solved.heat = None;
    solved.cases[0].rise = None;
    let report = text::estimate(&solved);
    for part in [
        ": 0.3000 K/W above the sink surface",
        "across the faces 0.1100 K/W",
    ] {
        assert!(
            report.replace("\n  ", " ").contains(part),
            "{part}: {report}"
        );
    }
    assert!(report.lines().all(|line| line.chars().count() <= WIDTH));
}

#[test]
fn media_stand_in_one_table_with_what_a_test_in_gas_says() {
    let row = |word: &str, added: f64| InMedium {
        medium: Medium::named(word, None).expect("a medium"),
        source_to_sink: band(0.9 * added + 0.04, added + 0.04, 1.1 * added + 0.04),
        added_by_joint: band(0.9 * added, added, 1.1 * added),
        rise: Some(Band::nominal(22.0 * (added + 0.04))),
    };
    let rows = [row("vacuum", 0.3), row("air", 0.1), row("helium", 0.29)];
    let table = media::table(&rows, "service", System::Si);
    for part in [
        "vacuum",
        "101.3",
        "0.3300",
        "a test in air reads 3.0 times better than vacuum",
        "a test in helium reads like vacuum",
    ] {
        assert!(table.contains(part), "{part}: {table}");
    }
    assert!(
        table.lines().all(|line| line.chars().count() <= WIDTH),
        "{table}"
    );
    let object = json::media(&rows);
    has(
        &object[1],
        &[
            "medium",
            "pressure",
            "source_to_sink",
            "added_by_joint",
            "rise",
            "vacuum_over_medium",
        ],
    );
    assert_eq!(object[0]["pressure"], Value::Null);
    assert_eq!(object[1]["pressure"], json!(101_325.0));
    assert!((object[1]["vacuum_over_medium"].as_f64().expect("a ratio") - 3.0).abs() < 1e-12);
    // Without vacuum there is nothing to hold a gas against.
    assert!(!media::table(&rows[1..], "service", System::Si).contains("a test in"));
    assert_eq!(
        json::media(&rows[1..])[0]["vacuum_over_medium"],
        Value::Null
    );
    assert_eq!(media::table(&[], "service", System::Si), "");
}

#[test]
fn the_sum_of_the_rings_is_set_against_what_the_joint_adds() {
    let ring = RingRow {
        radius: [0.002, 0.003],
        area: 1e-5,
        pressure: 1e6,
        conductance: 1e4,
        share: 0.1,
        cumulative: 100.0,
    };
    let told = text::ring_sum(&estimate(), &[vec![ring], vec![ring]]);
    // Two bolts of 100 W/K; the joint adds 0.125 K/W, 25 times 1/200.
    for part in [
        "200.0 W/K",
        "0.005000 K/W",
        "0.1250 K/W",
        "25.00 times",
        "contact only",
    ] {
        assert!(told.contains(part), "{part}: {told}");
    }
    assert_eq!(text::ring_sum(&estimate(), &[]), "");
}
