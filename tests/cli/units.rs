//! `--units`: every command that tells people, in each system.

use crate::{json, ringsum, stdout};
use std::fs;
use tempfile::tempdir;

/// Units of SI that an inch drawing never shows.
const METRIC: [&str; 14] = [
    "mm", "µm", "nm", "N·m", "N", "kN", "MN", "Pa", "kPa", "MPa", "GPa", "mm²", "°C", "kg",
];

/// Lines that tell a metric unit, but for an order of magnitude in words; words are apart at spaces, commas and brackets.
fn metric(text: &str) -> Vec<&str> {
    let apart = |letter: char| letter.is_whitespace() || ",;:()<>".contains(letter);
    text.lines()
        .filter(|line| !line.contains("by some µm there"))
        .filter(|line| line.split(apart).any(|word| METRIC.contains(&word)))
        .collect()
}

fn told(arguments: &[&str]) -> String {
    let assert = ringsum().args(arguments).assert().code(0);
    stdout(&assert)
}

#[test]
fn no_line_in_inches_tells_a_metric_unit() {
    let mut seen = 0;
    for entry in fs::read_dir("joints").unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let name = path.to_str().unwrap();
        let run = ringsum()
            .args([
                "estimate", name, "--field", "cone", "--draws", "64", "--full",
            ])
            .args(["--units", "inch", "--media", "vacuum,air"])
            .assert();
        // What the cone cannot carry is told on a solved field elsewhere.
        let report = String::from_utf8_lossy(&run.get_output().stdout).into_owned();
        if report.is_empty() {
            continue;
        }
        seen += 1;
        // Title and planes stand as the file has them.
        let body = report.split_once("\n\n").unwrap().1;
        assert_eq!(metric(body), Vec::<&str>::new(), "{name}");
        for line in report.lines() {
            assert!(line.chars().count() <= 110, "{name}: {line}");
        }
    }
    assert_eq!(seen, 12);
    for arguments in [
        &[
            "estimate",
            "joints/avionics_shim.toml",
            "--resolution",
            "fast",
            "--draws",
            "0",
            "--rings",
        ][..],
        &[
            "torque",
            "joints/sensor_lid.toml",
            "--field",
            "cone",
            "--draws",
            "0",
        ],
        &[
            "compare",
            "joints/sensor_lid.toml",
            "--field",
            "cone",
            "--draws",
            "64",
        ],
        &[
            "drivers",
            "joints/rig_coupon.toml",
            "--field",
            "cone",
            "--draws",
            "256",
        ],
        &["arrange", "joints/service_lid.toml", "--solve", "1"],
    ] {
        let report = told(&[arguments, &["--units", "inch"]].concat());
        let body = report.split_once('\n').unwrap().1;
        let body = body.split_once("\n\n").map_or(body, |(_, body)| body);
        assert_eq!(metric(body), Vec::<&str>::new(), "{arguments:?}");
    }
}

#[test]
fn numbers_are_those_of_si_by_known_conversions() {
    let arguments = [
        "estimate",
        "joints/rig_coupon.toml",
        "--field",
        "cone",
        "--draws",
        "0",
    ];
    let object = json(
        &ringsum()
            .args(arguments)
            .args(["--json", "--units", "inch"])
            .assert()
            .code(0),
    );
    // JSON is SI whatever is asked for, and says so.
    assert_eq!(object["units"], "SI");
    let case = &object;
    let force = case["bolts"][0]["force"]["nominal"].as_f64().unwrap();
    let whole = &case["results"]["source_to_sink"]["resistance"]["nominal"];
    let whole = whole.as_f64().unwrap();
    let report = told(&[&arguments[..], &["--units", "inch"]].concat());
    let row = |name: &str, (place, cell): (usize, usize)| -> f64 {
        let mut rows = report.lines().filter(|line| line.starts_with(name));
        let cells: Vec<&str> = rows.nth(place).unwrap()[name.len()..]
            .split_whitespace()
            .collect();
        let cells: Vec<f64> = cells.iter().filter_map(|cell| cell.parse().ok()).collect();
        cells[cell]
    };
    // Four printed digits.
    let same = |one: f64, other: f64| (one / other - 1.0).abs() < 1e-3;
    // 1 lbf = 4.4482216152605 N, by definition of pound and standard gravity.
    assert!(
        same(row("bolt 1", (0, 1)), force / 4.448_221_615_260_5),
        "{report}"
    );
    assert!(same(row("source to sink", (0, 0)), whole), "{report}");
    // 1 Btu_IT/(h·°F) = 1055.05585262 / 3600 × 1.8 W/K.
    assert!(
        same(row("source to sink", (1, 0)), whole * 0.527_527_926_31),
        "{report}"
    );
    let shop = told(&[&arguments[..], &["--units", "shop"]].concat());
    assert!(shop.contains("N/mm²") && !shop.contains("MPa"), "{shop}");
    assert_eq!(
        told(&arguments),
        told(&[&arguments[..], &["--units", "si"]].concat())
    );
}

#[test]
fn the_page_tells_inches_and_so_does_what_is_drawn() {
    let folder = tempdir().unwrap();
    let out = folder.path().join("page.html");
    ringsum()
        .args([
            "report",
            "joints/rig_coupon.toml",
            "--field",
            "cone",
            "--draws",
            "64",
        ])
        .args(["--units", "inch", "--out"])
        .arg(&out)
        .assert()
        .code(0);
    let page = fs::read_to_string(&out).unwrap();
    assert!(page.contains("Torque, in·lbf"));
    let figures: Vec<&str> = page.split("<svg").skip(1).collect();
    assert!(figures.iter().any(|figure| figure.contains("in·lbf")));
    for figure in figures
        .iter()
        .filter_map(|rest| rest.split("</svg>").next())
    {
        // Heat stays in K/W; lengths, torques and pressures do not stay metric.
        for unit in ["N·m<", " mm<", "MPa<", "µm<", "°C<"] {
            assert!(!figure.contains(unit), "{unit}");
        }
    }
    assert!(page.contains("--units inch"));
    let told = page.split("<ul class=\"told\">").skip(1);
    let mut lists = 0;
    for list in told.filter_map(|rest| rest.split("</ul>").next()) {
        lists += 1;
        assert_eq!(metric(list), Vec::<&str>::new());
    }
    assert!(lists > 1);
}

/// Rows stand under their headings in every system, and labels keep their room.
#[test]
fn tables_stay_tables_in_every_system() {
    let joint = [
        "estimate",
        "joints/rf_flange.toml",
        "--field",
        "cone",
        "--draws",
        "0",
    ];
    for units in ["si", "shop", "inch"] {
        let told = told(&[&joint[..], &["--units", units]].concat());
        let mut lines = told
            .lines()
            .skip_while(|line| !line.starts_with("per bolt  "));
        let [heading, row] = [lines.next(), lines.next()].map(|line| line.expect("a table"));
        // Right-aligned columns end where their headings end.
        assert_eq!(heading.chars().count(), row.chars().count(), "{told}");
        assert!(row.starts_with("bolts 1 to 2  "), "{told}");
    }
}
