//! Tables of points: what is read, and every fault at its place.

use super::*;
use crate::diagnostic::{Colour, shown};
use proptest::prelude::*;

fn faults(text: &str) -> String {
    let found = Readings::read(text).expect_err("the table is at fault");
    let shown: Vec<String> = found
        .iter()
        .map(|fault| shown(fault, "points.csv", text, Colour::Plain))
        .collect();
    shown.join("\n")
}

#[test]
fn a_table_is_read_in_si() {
    let text = "\u{feff}# rig 3\r\n\"pressure [MPa]\", R [K·cm²/W], sigma [%], direction, specimen\r\n\r\n\
                2, 0.5, 4, loading, a\r\n\"4\",0.25,5,unloading,\"b, second\"\r\n";
    let found = Readings::read(text).unwrap();
    assert_eq!(found.abscissa, Some(Abscissa::Pressure));
    assert_eq!(found.ordinate, Ordinate::AreaResistance);
    let first = &found.rows[0];
    assert_eq!((first.line, first.abscissa), (4, Some(2e6)));
    // 0.5 K cm²/W is 5e-5 K m²/W; rounding alone.
    assert!((first.conductance - 2e4).abs() < 1e-8);
    assert!((first.deviation.unwrap() - 0.04).abs() < 1e-15);
    assert_eq!(found.rows[1].direction, Some(Direction::Unloading));
    assert_eq!(found.rows[1].specimen.as_deref(), Some("b, second"));
}

#[test]
fn absolute_deviations_become_shares() {
    let text = "torque [N·m]; conductance [W/K]; sigma [W/K]\n1.5; 4; 0.2\n";
    let found = Readings::read(text).unwrap();
    // 0.2 of 4; rounding alone.
    assert!((found.rows[0].deviation.unwrap() - 0.05).abs() < 1e-15);
    let text = "force [kN], R [K/W], sigma [K/W]\n5, 0.25, 0.01\n";
    let found = Readings::read(text).unwrap();
    assert!((found.rows[0].deviation.unwrap() - 0.04).abs() < 1e-15);
    assert!((found.rows[0].conductance - 4.0).abs() < 1e-12);
}

#[test]
fn every_fault_of_the_rows_is_told_at_its_place() {
    let text = "pressure [MPa], h [W/(m²·K)], direction\n\
                1, -5, loading\n2, abc, up\n3,5, 7000, up\n4, 9000, sideways\n, 3, up\n0, 1, up\n";
    let told = faults(text);
    for (place, says) in [
        ("points.csv:2:4", "`-5` is not above zero"),
        ("points.csv:3:4", "`abc` is not a number"),
        ("points.csv:4:1", "this line has 4 cells"),
        ("points.csv:5:10", "`sideways` is no direction"),
        ("points.csv:6:1", "this cell is empty"),
        ("points.csv:7:1", "`0` is not above zero"),
    ] {
        assert!(
            told.contains(place) && told.contains(says),
            "{place} {says}\n{told}"
        );
    }
    assert!(told.contains("or separate the cells by `;`"), "{told}");
}

#[test]
fn a_decimal_comma_is_told_as_one() {
    let told = faults("pressure [MPa]; h [W/(m²·K)]\n3,5; 7000\n");
    assert!(
        told.contains("points.csv:2:1") && told.contains("has a comma"),
        "{told}"
    );
    assert!(told.contains("`12.5`"), "{told}");
}

#[test]
fn faults_of_the_heading_are_told_together() {
    let told = faults("pressur [MPa], h, p [MPa], pressure [MPa]\n1,2,3,4\n");
    assert!(told.contains("did you mean `pressure`?"), "{told}");
    assert!(
        told.contains("points.csv:1:28") && told.contains("says the same as"),
        "{told}"
    );
    let told = faults("pressure, h [MPa]\n1,2\n");
    assert!(told.contains("has no unit of a conductance"), "{told}");
    let told = faults("pressure [N], h [W/(m²·K)], sigma\n1,2,3\n");
    assert!(
        told.contains("points.csv:1:1") && told.contains("is a force"),
        "{told}"
    );
    assert!(
        told.contains("points.csv:1:29") && told.contains("has no unit"),
        "{told}"
    );
    // A unit that is missing hides nothing of the other columns.
    let told = faults("h, pressure [N], sigma, p\n1,2,3,4\n");
    for (place, says) in [
        ("points.csv:1:1", "`h` has no unit"),
        ("points.csv:1:4", "is a force"),
        ("points.csv:1:18", "`sigma` has no unit"),
        ("points.csv:1:25", "says the same as"),
    ] {
        assert!(
            told.contains(place) && told.contains(says),
            "{place} {says}\n{told}"
        );
    }
    assert!(faults("pressure [MPa]\n1\n").contains("no column holds what was measured"));
    assert!(faults("").contains("is empty"));
    assert!(faults("# nothing\n").contains("is empty"));
    assert!(faults("h [W/(m²·K)]\n").contains("0 readings"));
}

#[test]
fn lines_left_out_are_known_or_given_back() {
    let found = Readings::read("p [MPa], h [W/(m²·K)]\n1, 2\n3, 4\n").unwrap();
    let (kept, strange) = found.without(&[3, 9]);
    assert_eq!(kept.rows.len(), 1);
    assert_eq!(strange, [9]);
}

proptest! {
    #![proptest_config(crate::fixed_cases(300))]

    #[test]
    fn no_text_makes_the_reader_fall_over(text in "(?s)(p \\[MPa\\]|h \\[W/K\\]|[,;\"#\r\n\t 0-9.µ\\-]|.){0,40}") {
        if let Err(found) = Readings::read(&text) {
            for fault in found {
                shown(&fault, "a", &text, Colour::Plain);
            }
        }
    }
}
