//! `compare` and its variants, `--without`.

use std::fs;

use serde_json::Value;
use tempfile::tempdir;

use crate::{names, ringsum, stderr, stdout, within};

const DEMO: &str = "joints/sensor_lid.toml";

#[test]
fn variants_stand_in_one_table_and_the_best_is_named() {
    let told = ringsum()
        .args(["compare", DEMO, "--field", "cone", "--draws", "128"])
        .assert()
        .code(0)
        .stderr_eq("");
    let text = stdout(&told);
    for line in [
        "5 joints, field cone, normal; low and high: 5 % and 95 % of 128 draws, seed 1",
        "best     six bolts: least source to sink at nominal",
    ] {
        assert!(text.lines().any(|told| told == line), "{line}\n{text}");
    }
    for name in [
        "as stated",
        "more torque",
        "thicker carrier",
        "lapped carrier",
    ] {
        assert!(
            text.lines().any(|line| line.starts_with(name)),
            "{name}\n{text}"
        );
        let against = format!("against  {name}: better in ");
        assert!(
            text.lines().any(|line| line.starts_with(&against)),
            "{text}"
        );
    }
    assert!(
        text.lines().all(|line| line.chars().count() <= 110),
        "{text}"
    );
}

#[test]
fn a_joint_that_may_open_is_met_of_heat_alone_wherever_it_is_told() {
    // The lap keeps its clamp force and its strength.
    let [open, sound] = ["joints/isolating_mount.toml", "joints/busbar_lap.toml"];
    let cone = ["--field", "cone", "--draws", "64"];
    let told = ringsum()
        .args(["compare", open, sound])
        .args(cone)
        .assert()
        .code(0);
    let text = stdout(&told);
    let row = |name: &str| {
        let rows = text.lines().filter(|line| line.starts_with(name));
        rows.filter(|line| line.contains("met")).collect::<String>()
    };
    assert!(row("isolating_mount").contains("met*"), "{text}");
    assert!(
        text.contains("* isolating_mount: of heat alone: the least clamp force"),
        "{text}"
    );
    assert!(row("busbar_lap").contains("met "), "{text}");
    // The best of them is the one that may open, and best as one requirement has it, not the other.
    assert!(
        text.contains("nominal\n         of heat alone: the least clamp force"),
        "{text}"
    );
    let opposite = "the requirement of busbar_lap asks for the opposite";
    assert!(text.replace("\n  ", " ").contains(opposite), "{text}");
    let reason = |file: &str| -> Value {
        let run = ringsum().args(["estimate", file, "--json"]).args(cone);
        let found: Value =
            serde_json::from_str(&stdout(&run.assert().code(0))).expect("one object");
        assert_eq!(found["requirement"]["met"], true, "{file}");
        found["requirement"]["of_heat_alone"].clone()
    };
    assert!(reason(open).is_string());
    assert!(reason(sound).is_null());
    let folder = tempdir().expect("a folder");
    let results = folder.path().join("results");
    ringsum()
        .args(["estimate", open, sound, "--out"])
        .arg(&results)
        .args(cone)
        .assert()
        .code(0);
    let csv = fs::read_to_string(results.join("estimates.csv")).expect("the table");
    let judged = |file: &str| {
        let lines = csv.lines().filter(|line| line.contains(file));
        lines
            .map(|line| line.contains("met of heat alone"))
            .collect::<Vec<_>>()
    };
    assert_eq!(judged("isolating_mount"), [true], "{csv}");
    assert_eq!(judged("busbar_lap"), [false], "{csv}");
}

#[test]
fn the_json_holds_every_estimate_and_what_else_counts() {
    let told = ringsum()
        .args([
            "compare", DEMO, "--field", "cone", "--draws", "64", "--json",
        ])
        .assert()
        .code(0);
    let found: Value = serde_json::from_str(&stdout(&told)).expect("one object");
    let joints = found["joints"].as_array().expect("a list");
    assert_eq!(joints.len(), 5);
    assert_eq!(found["best"], "six bolts");
    for joint in joints {
        let estimate = &joint["estimate"];
        assert!(estimate["results"]["source_to_sink"]["resistance"]["high"].is_f64());
        assert!(estimate["rise"]["nominal"].is_f64() && joint["strength_use"].is_f64());
        assert!(joint["mass"]["total"].as_f64() > joint["mass"]["fasteners"].as_f64());
        assert!(
            joint["worst_loss"]["growth"].as_f64() > Some(1.0),
            "{joint}"
        );
        let best = joint["name"] == found["best"];
        assert_eq!(joint["best_beats_it"].is_null(), best);
    }
    assert_eq!(joints[1]["bolts"], 6);
    assert_eq!(
        [&joints[0]["cost"], &joints[1]["cost"]],
        [1.0, 1.3].map(Value::from).each_ref()
    );
    let strict = ringsum()
        .args([
            "compare",
            DEMO,
            "--field",
            "cone",
            "--draws",
            "0",
            "--strict",
            "--no-loss",
        ])
        .assert()
        .code(3);
    assert!(!stdout(&strict).contains("lost"));
}

#[test]
fn several_files_are_called_by_their_names() {
    let told = ringsum()
        .args(["compare", "joints/led_board.toml", "joints/rig_coupon.toml"])
        .args([
            "--field",
            "cone",
            "--draws",
            "0",
            "--set",
            "service.medium=vacuum",
        ])
        .assert()
        .code(0);
    let text = stdout(&told);
    assert!(
        text.contains("led_board") && text.contains("rig_coupon"),
        "{text}"
    );
}

#[test]
fn one_joint_is_nothing_to_compare() {
    let told = ringsum()
        .args(["compare", "joints/led_board.toml"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&told).contains("a comparison needs two"));
}

#[test]
fn every_fault_of_every_variant_is_told_with_its_place() {
    let folder = tempdir().expect("a folder");
    let base = fs::read_to_string(DEMO).expect("the demo is there");
    let text = base
        .replace("\"1.7 N·m\"\n", "\"2 kg\"\n")
        .replace(
            "plate.carrier.thickness = \"4 mm\"",
            "plate.carier.thickness = \"4 mm\"",
        )
        .replace(
            "fastener.pattern.count = [3, 2]",
            "fastener.pattern.count = [60, 2]",
        );
    fs::write(folder.path().join("bad.toml"), text).expect("it is written");
    let told = within(&folder)
        .args(["compare", "bad.toml"])
        .assert()
        .code(2)
        .stdout_eq("");
    let told = stderr(&told);
    for word in [
        "variant `six bolts`",
        "variant `more torque`",
        "variant `thicker carrier`",
        "bad.toml:",
    ] {
        assert!(told.contains(word), "{word}\n{told}");
    }
    within(&folder)
        .args(["check", "bad.toml"])
        .assert()
        .code(2)
        .stdout_eq("");
    // The joint as stated is sound: its variants do not stand in its way, which is told.
    let told = within(&folder)
        .args(["estimate", "bad.toml", "--field", "cone", "--draws", "0"])
        .assert()
        .code(0);
    assert!(stderr(&told).contains("4 variants left aside"));
}

#[test]
fn a_variant_can_be_estimated_alone() {
    let foot = |arguments: &[&str]| -> Value {
        let told = ringsum()
            .args([
                "estimate", DEMO, "--field", "cone", "--draws", "0", "--json",
            ])
            .args(arguments)
            .assert()
            .code(0);
        serde_json::from_str(&stdout(&told)).expect("one object")
    };
    let variant = foot(&["--variant", "more torque"]);
    let set = foot(&["--set", "fastener.torque.value=\"1.7 N·m\""]);
    assert_eq!(variant["results"], set["results"]);
    assert_eq!(variant["variant"], "more torque");
    let told = ringsum()
        .args(["estimate", DEMO, "--variant", "gold"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&told).contains("its variants are six bolts, more torque"));
}

#[test]
fn bolts_are_left_out_by_their_numbers() {
    let run = |without: &str| {
        ringsum()
            .args([
                "estimate",
                DEMO,
                "--field",
                "cone",
                "--draws",
                "0",
                "--without",
                without,
            ])
            .assert()
    };
    let text = stdout(&run("3").code(0));
    assert!(text.contains("without bolt 3: the hole stays"), "{text}");
    assert!(text.contains("bolt 3 left out"), "{text}");
    for (bad, told) in [
        ("5", "there is no bolt 5; bolts are numbered from 1 to 4"),
        ("0", "there is no bolt 0"),
        ("1,2,3,4", "no bolt is left"),
    ] {
        let found = run(bad).code(2).stdout_eq("");
        assert!(stderr(&found).contains(told), "{bad}: {}", stderr(&found));
    }
}

#[test]
fn the_figure_is_drawn_once_and_replaced_only_with_force() {
    let folder = tempdir().expect("a folder");
    let demo = fs::canonicalize(DEMO).expect("the demo is there");
    let run = |more: &[&str]| {
        within(&folder)
            .arg("compare")
            .arg(&demo)
            .args([
                "--field",
                "cone",
                "--draws",
                "64",
                "--no-loss",
                "--draw",
                "lid.svg",
            ])
            .args(more)
            .assert()
    };
    run(&[]).code(0);
    assert_eq!(names(folder.path()), ["lid.svg"]);
    let told = run(&[]).code(2).stdout_eq("");
    assert!(stderr(&told).contains("--force"));
    run(&["--force"]).code(0);
    let drawn = fs::read_to_string(folder.path().join("lid.svg")).expect("it is text");
    for word in ["lapped carrier", "best at nominal", "contact pressure, MPa"] {
        assert!(drawn.contains(word), "{word}");
    }
}
