//! The choice of the pressure field on the command line.

use std::fs;

use snapbox::str;

use crate::{names, ringsum, stderr, stdout, within};

/// Two bolts on small plates, so that the solved field is quick.
const JOINT: &str = r#"
title = "Two bolts"
[service]
medium = "air"
temperature = "20 °C"
heat = "5 W"
[[plate]]
name = "upper"
material = "Al 6061-T6"
thickness = "4 mm"
size = ["50 mm", "24 mm"]
finish = { roughness = "Ra 0.8 µm" }
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "4 mm"
size = ["50 mm", "24 mm"]
finish = { roughness = "Ra 0.8 µm" }
cooled = { film = "500 W/(m²·K)" }
[fastener]
thread = "M5"
grade = "8.8"
hole = "5.5 mm"
bearing = "8.5 mm"
engagement = { kind = "nut" }
torque = { value = "2 N·m", tolerance = "5 %" }
friction = { class = "B" }
at = [["10 mm", "12 mm"], ["40 mm", "12 mm"]]
"#;

fn bench() -> tempfile::TempDir {
    let folder = tempfile::tempdir().expect("a folder to work in");
    fs::write(folder.path().join("two.toml"), JOINT).expect("the joint can be written");
    folder
}

#[test]
fn an_unknown_field_or_resolution_is_a_usage_error_that_names_the_known_ones() {
    for (arguments, known) in [
        (["--field", "magic"], "cone, elastic"),
        (["--resolution", "finest"], "fast, normal, fine"),
        (["--memory", "3"], "--memory \"2 GB\""),
    ] {
        let told = stderr(
            &ringsum()
                .args(["estimate", "x.toml"])
                .args(arguments)
                .assert()
                .code(2)
                .stdout_eq(""),
        );
        assert!(told.contains(known), "{told}");
    }
}

#[test]
fn options_of_the_elastic_field_are_refused_beside_the_cone() {
    let folder = bench();
    let told = stderr(
        &within(&folder)
            .args(["estimate", "two.toml", "--resolution", "fast"])
            .assert()
            .code(2)
            .stdout_eq(""),
    );
    assert!(told.contains("add --field elastic"), "{told}");
}

#[test]
fn the_solved_field_tells_its_gap_and_the_cone_beside() {
    let folder = bench();
    let run = |more: &[&str]| {
        within(&folder)
            .args([
                "estimate",
                "two.toml",
                "--field",
                "elastic",
                "--resolution",
                "fast",
            ])
            .args(["--draws", "20"])
            .args(more)
            .assert()
            .code(0)
            .stderr_eq("")
    };
    let told = stdout(&run(&["--full"]));
    for part in [
        "field elastic, fast",
        "gap between the faces",
        "cone: 95 % within",
        "solver: ",
    ] {
        assert!(told.contains(part), "{part}: {told}");
    }
    let object = stdout(&run(&["--json", "--rings"]));
    let object: serde_json::Value = serde_json::from_str(&object).expect("one object");
    assert_eq!(
        (&object["field"], &object["resolution"]),
        (&"elastic".into(), &"fast".into())
    );
    let pressure = &object["pressure"];
    assert!(
        pressure["gap_max"].as_f64().is_some_and(|gap| gap > 1e-7),
        "{pressure}"
    );
    assert!(
        object["draw_error"]
            .as_f64()
            .is_some_and(|error| error < 0.01),
        "{object}"
    );
    // The rings of all bolts together carry what the faces carry.
    let rings = object["rings"].as_array().expect("rings of every bolt");
    let force: f64 = rings
        .iter()
        .flat_map(|table| table.as_array().expect("a table"))
        .map(|ring| {
            ring["area"].as_f64().expect("an area") * ring["pressure"].as_f64().expect("a pressure")
        })
        .sum();
    let carried = pressure["force"].as_f64().expect("a force");
    // The same samples carry both; only the order of the sums differs.
    assert!((force / carried - 1.0).abs() < 1e-9, "{force} {carried}");
}

#[test]
fn a_grid_beyond_the_memory_is_refused_with_the_way_out() {
    let folder = bench();
    let told = stderr(
        &within(&folder)
            .args([
                "estimate", "two.toml", "--field", "elastic", "--memory", "1 MB",
            ])
            .assert()
            .code(2)
            .stdout_eq(""),
    );
    for part in ["limit of 1 MB", "--memory", "--resolution fast"] {
        assert!(told.contains(part), "{part}: {told}");
    }
}

#[test]
fn a_solved_field_is_drawn_with_its_gap() {
    let folder = bench();
    let draw = || {
        within(&folder)
            .args([
                "draw",
                "two.toml",
                "--field",
                "elastic",
                "--resolution",
                "fast",
            ])
            .args(["--out", "figures"])
            .assert()
    };
    draw().code(0).stdout_eq(str![[""]]);
    let written = names(&folder.path().join("figures"));
    assert_eq!(
        written,
        ["conductance.svg", "cumulative.svg", "pressure_and_gap.svg"]
    );
    // Nothing is overwritten unasked.
    draw().code(2);
}

#[test]
fn torque_in_air_knows_that_the_gap_grows() {
    let folder = bench();
    let swept = stdout(
        &within(&folder)
            .args([
                "torque",
                "two.toml",
                "--field",
                "elastic",
                "--resolution",
                "fast",
            ])
            .args([
                "--draws", "0", "--steps", "5", "--json", "--from", "0.2 N·m", "--to", "4 N·m",
            ])
            .assert()
            .code(0),
    );
    let swept: serde_json::Value = serde_json::from_str(&swept).expect("one object");
    let whole: Vec<f64> = swept["points"]
        .as_array()
        .expect("points")
        .iter()
        .map(|point| {
            point["source_to_sink"]["resistance"]["nominal"]
                .as_f64()
                .expect("a number")
        })
        .collect();
    // More force opens the gap beside the bolts, and in air that costs more than the contact gains.
    assert!(whole[4] > 1.01 * whole[1], "{whole:?}");
}

#[test]
fn threads_change_no_digit_and_fillers_have_their_draws() {
    let folder = bench();
    let run = |threads: &str, set: &str| {
        stdout(
            &within(&folder)
                .env("RAYON_NUM_THREADS", threads)
                .args([
                    "estimate",
                    "two.toml",
                    "--field",
                    "elastic",
                    "--resolution",
                    "fast",
                ])
                .args(["--draws", "20", "--json", "--set", set])
                .assert()
                .code(0),
        )
    };
    for set in [
        "plate.upper.finish.flatness=\"20 µm\"",
        "plate.upper.bow={ kind = \"concave\", height = \"15 µm\" }",
        "filler.name=\"graphite foil\"",
    ] {
        let one = run("1", set);
        assert!(one == run("2", set), "{set}");
        assert!(one.contains("\"draw_error\": 0."), "{set}: {one}");
    }
}
