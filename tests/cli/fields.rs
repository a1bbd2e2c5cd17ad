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
        (["--field", "magic"], "elastic, cone"),
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
fn every_command_stands_on_the_solved_field_unless_told_otherwise() {
    let folder = bench();
    let run = |arguments: &[&str]| {
        let command = within(&folder).args(arguments);
        stdout(&command.args(["--draws", "0"]).assert().code(0))
    };
    for (arguments, told) in [
        (
            ["estimate", "two.toml"].as_slice(),
            "\nfield elastic, normal; ",
        ),
        (
            &["estimate", "two.toml", "--field", "cone"],
            "\nfield cone, ",
        ),
        (
            &["torque", "two.toml", "--steps", "2"],
            "\nfield elastic, normal\n",
        ),
    ] {
        let found = run(arguments);
        assert!(found.contains(told), "{arguments:?}: {found}");
    }
    for command in [
        ["estimate", "two.toml"].as_slice(),
        &["torque", "two.toml", "--steps", "2"],
    ] {
        let object = run(&[command, &["--json"]].concat());
        let object: serde_json::Value = serde_json::from_str(&object).expect("one object");
        let named = (&object["field"], &object["resolution"]);
        assert_eq!(named, (&"elastic".into(), &"normal".into()));
    }
}

#[test]
fn threads_in_both_plates_are_led_to_the_cone() {
    let folder = bench();
    let bolt = JOINT
        .split("[fastener]")
        .nth(1)
        .expect("the joint has bolts")
        .replace("kind = \"nut\"", "kind = \"tapped\"");
    let plates = JOINT
        .split("[fastener]")
        .next()
        .expect("the joint has plates");
    let (left, right) = (
        bolt.replace(", [\"40 mm\", \"12 mm\"]", ""),
        bolt.replace("[\"10 mm\", \"12 mm\"], ", ""),
    );
    let both = format!("{plates}[[fastener]]{left}[[fastener]]{right}from = \"lower\"\n");
    fs::write(folder.path().join("both.toml"), both).expect("the joint can be written");
    let run = |more: &[&str]| {
        let command = within(&folder).args(["estimate", "both.toml", "--draws", "0"]);
        command.args(more).assert()
    };
    let told = stderr(&run(&[]).code(1).stdout_eq(""));
    assert!(told.contains("`--field cone`"), "{told}");
    run(&["--field", "cone"]).code(0);
}

#[test]
fn options_of_the_elastic_field_are_refused_beside_the_cone() {
    let folder = bench();
    let told = stderr(
        &within(&folder)
            .args(["estimate", "two.toml", "--field", "cone"])
            .args(["--resolution", "fast"])
            .assert()
            .code(2)
            .stdout_eq(""),
    );
    assert!(told.contains("leave out --field cone"), "{told}");
}

#[test]
fn the_solved_field_tells_its_gap_and_the_cone_beside() {
    let folder = bench();
    let run = |more: &[&str]| {
        within(&folder)
            .args(["estimate", "two.toml", "--resolution", "fast"])
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
            .args(["estimate", "two.toml", "--memory", "1 MB"])
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
            .args(["draw", "two.toml", "--resolution", "fast"])
            .args(["--out", "figures"])
            .assert()
    };
    draw().code(0).stdout_eq(str![[""]]);
    let written = names(&folder.path().join("figures"));
    assert_eq!(
        written,
        [
            "conductance.svg",
            "cumulative.svg",
            "flux.svg",
            "pressure_and_gap.svg",
            "section.svg",
            "temperature.svg"
        ]
    );
    // Nothing is overwritten unasked.
    draw().code(2);
}

#[test]
fn torque_in_air_knows_that_the_gap_grows() {
    let folder = bench();
    let swept = stdout(
        &within(&folder)
            .args(["torque", "two.toml", "--resolution", "fast"])
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
                .args(["estimate", "two.toml", "--resolution", "fast"])
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

/// One bolt in two discs, solved in radius and height.
const ROUND: &str = r#"
title = "Round pair"
[service]
medium = "vacuum"
temperature = "20 °C"
[[plate]]
name = "warm"
material = "Al 6061-T6"
thickness = "6 mm"
diameter = "50 mm"
finish = { roughness = "Ra 0.8 µm" }
[[plate]]
name = "cold"
material = "Al 6061-T6"
thickness = "6 mm"
diameter = "50 mm"
finish = { roughness = "Ra 0.8 µm" }
cooled = { film = "500 W/(m²·K)" }
[fastener]
thread = "M5"
grade = "8.8"
hole = "5.5 mm"
bearing = "8.5 mm"
engagement = { kind = "nut" }
preload = "4 kN"
at = ["0 mm", "0 mm"]
"#;

fn draw(folder: &tempfile::TempDir, file: &str) -> std::path::PathBuf {
    within(folder)
        .args(["draw", file, "--resolution", "fast"])
        .args(["--out", "figures"])
        .assert()
        .code(0);
    folder.path().join("figures")
}

#[test]
fn a_section_tells_the_heat_of_the_joint_or_per_watt() {
    let folder = bench();
    fs::write(folder.path().join("round.toml"), ROUND).expect("the joint can be written");
    let figures = draw(&folder, "two.toml");
    let read = |name: &str| fs::read_to_string(figures.join(name)).expect("a figure");
    let [section, faces] = ["section.svg", "temperature.svg"].map(read);
    for part in [
        "upper on lower; temperature above",
        "at 5\u{a0}W",
        "at y = 12 mm",
    ] {
        assert!(section.contains(part), "{part}");
    }
    assert!(section.contains("between bolts 1 and 2: "));
    assert!(faces.contains("face of upper, K") && faces.contains("face of lower, K"));
    fs::remove_dir_all(&figures).expect("the test made it");
    // Round plates are solved on another mesh and show the same; no heat is stated there.
    let figures = draw(&folder, "round.toml");
    let section = fs::read_to_string(figures.join("section.svg")).expect("a figure");
    for part in [
        "warm on cold",
        "per watt",
        "away from the bolt: ",
        "K/W across",
    ] {
        assert!(section.contains(part), "{part}");
    }
}

#[test]
fn rings_of_solved_fields_add_up_to_the_contact_and_say_that_it_is_not_the_joint() {
    let folder = bench();
    fs::write(folder.path().join("round.toml"), ROUND).expect("the joint can be written");
    for (file, bolts) in [("two.toml", 2), ("round.toml", 1)] {
        let run = |more: &str| {
            stdout(
                &within(&folder)
                    .args(["estimate", file, "--resolution", "fast"])
                    .args(["--draws", "0", "--rings", more])
                    .assert()
                    .code(0),
            )
        };
        let told = run("--brief");
        assert!(told.contains("rings around bolt 1") && told.contains("hottest point at x"));
        assert!(told.contains("contact only, never"), "{told}");
        let object: serde_json::Value = serde_json::from_str(&run("--json")).expect("one object");
        let tables = object["rings"].as_array().expect("tables");
        assert_eq!(tables.len(), bolts);
        let ends = tables.iter().filter_map(|table| table.as_array()?.last());
        let sum: f64 = ends.filter_map(|ring| ring["cumulative"].as_f64()).sum();
        let contact = object["results"]["contact"]["conductance"]["nominal"].as_f64();
        let contact = contact.expect("a number");
        // The rings are summed on finer samples than the heat's own grid: 0.1 % and 0.3 % apart.
        assert!(
            (sum / contact - 1.0).abs() < 0.01,
            "{file}: {sum} {contact}"
        );
    }
}

#[test]
fn media_are_told_side_by_side_and_an_unknown_one_is_refused() {
    let folder = bench();
    let run = |more: &[&str]| {
        within(&folder)
            .args(["estimate", "two.toml", "--resolution", "fast"])
            .args(["--draws", "0"])
            .args(more)
            .assert()
    };
    let told = stdout(&run(&["--media", "vacuum,air", "--media", "helium"]).code(0));
    assert!(told.contains("times better than vacuum"), "{told}");
    let object = stdout(&run(&["--media", "vacuum,air,helium", "--json"]).code(0));
    let object: serde_json::Value = serde_json::from_str(&object).expect("one object");
    let added = |row: usize| {
        object["media"][row]["added_by_joint"]["resistance"]["nominal"]
            .as_f64()
            .expect("a number")
    };
    assert!(added(0) > added(1) && added(1) > added(2), "{object}");
    // The joint itself stands in air, where both tell the same number.
    let own = &object["results"]["added_by_joint"]["resistance"]["nominal"];
    let off = added(1) / own.as_f64().expect("a number") - 1.0;
    assert!(off.abs() < 1e-12, "{off}");
    let refused = stderr(&run(&["--media", "vacuum,air,heluim"]).code(2));
    assert!(refused.contains("did you mean `helium`"), "{refused}");
}

#[test]
fn the_best_torque_of_a_joint_that_is_to_resist_is_that_of_most_resistance() {
    let folder = bench();
    let swept = stdout(
        &within(&folder)
            .args([
                "torque", "two.toml", "--field", "cone", "--draws", "0", "--steps", "4", "--json",
            ])
            .args(["--set", "service.medium=vacuum"])
            .args([
                "--set",
                "service.require={ resistance = \"0.1 K/W\", bound = \"least\" }",
            ])
            .assert()
            .code(0),
    );
    let swept: serde_json::Value = serde_json::from_str(&swept).expect("one object");
    // In vacuum less torque resists more, down to the torque below which the plates may part.
    let least = &swept["window"]["strength"]["low"];
    assert_eq!(least["by"], "separation", "{swept}");
    assert_eq!(swept["best"], least["torque"], "{swept}");
}
