//! `ringsum arrange`: what it prints, writes and refuses, and that a stopped search goes on.

use snapbox::cmd::{Command, cargo_bin};
use std::fs;
#[cfg(unix)]
use std::path::Path;
use tempfile::{TempDir, tempdir};

/// A joint whose fields take a second together, with comments that must stay.
const JOINT: &str = r#"# Asked of the lid.
[service]
medium = "vacuum"
temperature = "20 °C"
heat = "5 W" # of the amplifier
require = { rise = "6 K" }

[[plate]]
material = "Al 6061-T6"
thickness = "5 mm"
size = ["50 mm", "40 mm"]
finish = "milled"

[[plate]]
material = "Al 6061-T6"
thickness = "5 mm"
size = ["50 mm", "40 mm"]
finish = "milled"
cooled = { film = "2000 W/(m²·K)" }

[fastener] # those of the lid
thread = "M4"
grade = "8.8"
head = "socket"
washer = "ISO 7089"
nut_washer = "ISO 7089"
torque = "2 N·m"
at = [["10 mm", "10 mm"]] # a start

[arrange]
bolts = [1, 4]
families = ["edge", "free"]
symmetry = "x"
step = "8 mm"
"#;

fn folder() -> TempDir {
    let folder = tempdir().expect("there is a folder");
    fs::write(folder.path().join("lid.toml"), JOINT).expect("it can be written");
    folder
}

fn ringsum(folder: &TempDir) -> Command {
    Command::new(cargo_bin!("ringsum"))
        .env("NO_COLOR", "1")
        .current_dir(folder.path())
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).expect("output is text")
}

fn json(folder: &TempDir, arguments: &[&str]) -> serde_json::Value {
    let assert = ringsum(folder)
        .args(["arrange", "lid.toml", "--json", "--solve", "2"])
        .args(arguments)
        .assert()
        .code(0);
    serde_json::from_slice(&assert.get_output().stdout).expect("it is JSON")
}

#[test]
fn each_layout_of_the_front_is_a_joint_that_estimate_reproduces() {
    let folder = folder();
    let found = json(&folder, &["--write", "out", "--draw", "layouts.svg"]);
    assert!(found["complete"] == true, "{found}");
    let rows = found["rows"].as_array().expect("there are rows");
    let front: Vec<&serde_json::Value> = rows.iter().filter(|row| row["front"] == true).collect();
    assert!(!front.is_empty());
    let names: Vec<String> = fs::read_dir(folder.path().join("out"))
        .expect("it is there")
        .map(|entry| {
            entry
                .expect("it is readable")
                .file_name()
                .into_string()
                .expect("a name")
        })
        .collect();
    assert_eq!(names.len(), front.len(), "{names:?}");
    let row = front[0];
    let name = format!(
        "out/{:02}-m4-{}.toml",
        row["bolts"].as_u64().expect("a number"),
        row["pattern"].as_str().expect("a word")
    );
    let written = fs::read_to_string(folder.path().join(&name)).expect("it was written");
    // All but the places stays, comments with it.
    for line in JOINT.lines().filter(|line| !line.starts_with("at =")) {
        assert!(written.contains(line), "{line}");
    }
    assert!(written.contains("] # a start"), "{written}");
    let estimate = ringsum(&folder)
        .args([
            "estimate",
            &name,
            "--resolution",
            "fast",
            "--draws",
            "0",
            "--json",
        ])
        .assert()
        .code(0);
    let estimate: serde_json::Value =
        serde_json::from_slice(&estimate.get_output().stdout).expect("it is JSON");
    let printed = &estimate["results"]["source_to_sink"]["resistance"]["nominal"];
    let [printed, found] = [printed, &row["resistance"]["source_to_sink"]]
        .map(|value| value.as_f64().expect("a number"));
    // The same field of the same places: coordinates differ by rounding alone.
    assert!((printed / found - 1.0).abs() < 1e-9, "{printed} {found}");
    // Nothing is overwritten.
    ringsum(&folder)
        .args(["arrange", "lid.toml", "--draw", "layouts.svg"])
        .assert()
        .code(2);
}

/// Estimate of a layout that was written, as the search took it.
fn estimated(folder: &TempDir, name: &str) -> serde_json::Value {
    let assert = ringsum(folder)
        .args(["estimate", name, "--resolution", "fast", "--json"])
        .args(["--draws", "256", "--seed", "1"])
        .assert()
        .code(0);
    serde_json::from_slice(&assert.get_output().stdout).expect("it is JSON")
}

/// Hot and cold, and two bolts that are not arranged: all of it counts, as `estimate` says.
#[test]
fn every_case_and_every_other_group_counts_up_to_the_end_of_the_band() {
    let folder = folder();
    let joint = JOINT
        .replace(
            "temperature = \"20 °C\"",
            "temperature = { hot = \"60 °C\", cold = \"0 °C\", assembly = \"20 °C\" }",
        )
        .replace("[fastener] #", "[[fastener]] #")
        .replace("bolts = [1, 4]", "bolts = [1, 2]")
        .replace(
            "[arrange]",
            "[[fastener]]\nthread = \"M4\"\ngrade = \"8.8\"\nhead = \"socket\"\ntorque = \"2 N·m\"\n\
             at = [[\"25 mm\", \"20 mm\"]]\n\n[arrange]",
        );
    fs::write(folder.path().join("lid.toml"), &joint).expect("it can be written");
    let found = json(&folder, &["--write", "out", "--checkpoint", "state.json"]);
    assert_eq!(found["cases"], serde_json::json!(["hot", "cold"]));
    assert_eq!(found["fixed_groups"][0], "M4 8.8, 1 place", "{found}");
    let limit = found["limit"]["resistance"].as_f64().expect("a number");
    let number = |value: &serde_json::Value| value.as_f64().expect("a number");
    let mut judged = 0;
    for row in found["rows"].as_array().expect("rows") {
        let cases = row["cases"].as_array().expect("cases");
        let worst = |case: &serde_json::Value| {
            ["nominal", "least_force", "largest_force"]
                .map(|key| number(&case[key]))
                .into_iter()
                .fold(0.0, f64::max)
        };
        let most = cases.iter().map(worst).fold(0.0, f64::max);
        // The case shown is the worst.
        assert!(worst(&row["resistance"]) >= most, "{row}");
        // Pitch to the bolt that stays: three diameters, whole micrometres.
        for place in row["at"].as_array().expect("places") {
            let apart = (number(&place[0]) - 0.025).hypot(number(&place[1]) - 0.02);
            assert!(apart > 0.012 - 3e-6, "{row}");
        }
        if row["front"] != true {
            assert!(cases[0]["low"].is_null(), "{row}");
            continue;
        }
        let name = format!(
            "out/{:02}-m4-{}.toml",
            number(&row["bolts"]) as usize,
            row["pattern"].as_str().expect("a word")
        );
        let estimate = estimated(&folder, &name);
        let mut highest: f64 = 0.0;
        for (case, told) in cases
            .iter()
            .zip(estimate["cases"].as_array().expect("cases"))
        {
            assert_eq!(case["case"], told["case"], "{told}");
            let band = &told["results"]["source_to_sink"]["resistance"];
            for key in ["low", "nominal", "high"] {
                // The same draws of the same field; places are rounded to micrometres alike.
                let ratio = number(&case[key]) / number(&band[key]);
                assert!((ratio - 1.0).abs() < 1e-9, "{key}: {case} {band}");
            }
            highest = highest.max(number(&case["high"]));
        }
        let meets = if highest <= limit { "yes" } else { "" };
        assert_eq!(row["meets"] == "yes", meets == "yes", "{row} {limit}");
        judged += 1;
    }
    assert!(judged > 0);
    let told = ringsum(&folder)
        .args([
            "arrange",
            "lid.toml",
            "--solve",
            "2",
            "--resume",
            "state.json",
        ])
        .assert()
        .code(0);
    let told = text(&told.get_output().stdout);
    assert!(told.contains("the worst of hot and cold"), "{told}");
    assert!(
        told.contains("not arranged, and counted as they stand: M4 8.8, 1 place"),
        "{told}"
    );
}

#[test]
fn threads_change_no_digit() {
    let folder = folder();
    assert_eq!(
        json(&folder, &["--jobs", "1"]),
        json(&folder, &["--jobs", "3"])
    );
}

/// The same layouts in a batch as alone, names that tell the joint, and a table of all; a file at fault
/// stops none of the others.
#[test]
fn many_joints_are_searched_as_each_alone() {
    let folder = folder();
    let thicker = JOINT.replace("thickness = \"5 mm\"", "thickness = \"6 mm\"");
    fs::write(folder.path().join("thick.toml"), thicker).expect("it can be written");
    fs::write(folder.path().join("bad.toml"), "[service]\n").expect("it can be written");
    let alone = json(&folder, &[]);
    let assert = ringsum(&folder)
        .args(["arrange", "lid.toml", "bad.toml", "thick.toml"])
        .args([
            "--solve", "2", "--jobs", "2", "--out", "found", "--write", "layouts",
        ])
        .assert()
        .code(1);
    let told = text(&assert.get_output().stderr);
    assert!(
        told.contains("bad.toml") && told.contains("layouts.csv"),
        "{told}"
    );
    let read = |name: &str| fs::read_to_string(folder.path().join(name)).expect("it was written");
    let found: serde_json::Value = serde_json::from_str(&read("found/lid.json")).expect("JSON");
    assert_eq!(found, alone);
    let front = |name: &str| {
        let found: serde_json::Value = serde_json::from_str(&read(name)).expect("JSON");
        let rows = found["rows"].as_array().expect("rows").clone();
        (
            rows.iter().filter(|row| row["front"] == true).count(),
            rows.len(),
        )
    };
    let table = read("found/layouts.csv");
    for (joint, others) in [("lid", "thick"), ("thick", "lid")] {
        let (on_front, rows) = front(&format!("found/{joint}.json"));
        let lines = table
            .lines()
            .filter(|line| line.starts_with(&format!("{joint}.toml,done")));
        assert_eq!(lines.count(), rows, "{table}");
        let names = fs::read_dir(folder.path().join("layouts")).expect("it was made");
        let names = names.map(|entry| entry.expect("readable").file_name());
        let of_joint = names.filter(|name| {
            let name = name.to_string_lossy();
            name.starts_with(&format!("{joint}-")) && !name.starts_with(&format!("{others}-"))
        });
        assert_eq!(of_joint.count(), on_front);
    }
    assert!(table.contains("bad.toml,faulty,"), "{table}");
    // One checkpoint keeps one search.
    ringsum(&folder)
        .args([
            "arrange",
            "lid.toml",
            "thick.toml",
            "--checkpoint",
            "state.json",
        ])
        .assert()
        .code(2);
}

/// A head over a heated zone is told, and none once the zone is kept free.
#[test]
fn heads_over_a_part_are_told_of() {
    let folder = folder();
    let zone = "centre = [\"25 mm\", \"20 mm\"], size = [\"44 mm\", \"34 mm\"]";
    let plate = "finish = \"milled\"\n\n[[plate]]";
    let heated = format!("finish = \"milled\"\nheated = {{ {zone} }}\n\n[[plate]]");
    let joint = JOINT.replacen(plate, &heated, 1);
    fs::write(folder.path().join("lid.toml"), &joint).expect("it can be written");
    let found = json(&folder, &[]);
    let rows = found["rows"].as_array().expect("rows");
    // The corners of the zone are within a head of every place that keeps its edge distance.
    assert!(
        rows.iter()
            .all(|row| row["heads_over_heat"] == row["bolts"]),
        "{found}"
    );
    let told = ringsum(&folder)
        .args(["arrange", "lid.toml", "--solve", "1"])
        .assert()
        .code(0);
    let told = text(&told.get_output().stdout);
    assert!(told.contains("heads reach over a heated zone"), "{told}");
    assert!(told.contains("arrange.keep_out"), "{told}");
    // A heated face is no part.
    fs::write(folder.path().join("lid.toml"), JOINT).expect("it can be written");
    let found = json(&folder, &[]);
    let rows = found["rows"].as_array().expect("rows");
    assert!(
        rows.iter().all(|row| row["heads_over_heat"] == 0),
        "{found}"
    );
}

/// Waits for a file that a process writes.
#[cfg(unix)]
fn waited_for(path: &Path, child: &mut std::process::Child) {
    while !path.exists() {
        assert!(
            child.try_wait().expect("it can be asked").is_none(),
            "it ended before"
        );
        std::thread::sleep(std::time::Duration::from_millis(2));
    }
}

#[cfg(unix)]
#[test]
fn a_stopped_search_goes_on_to_the_same_answer() {
    let folder = folder();
    let whole = json(&folder, &[]);
    let mut child = std::process::Command::new(cargo_bin!("ringsum"))
        .args([
            "arrange",
            "lid.toml",
            "--json",
            "--solve",
            "2",
            "--checkpoint",
            "state.json",
        ])
        .current_dir(folder.path())
        .stdout(std::process::Stdio::piped())
        .stderr(std::process::Stdio::piped())
        .spawn()
        .expect("the program starts");
    let state = folder.path().join("state.json");
    waited_for(&state, &mut child);
    let stopped = std::process::Command::new("kill")
        .args(["-INT", &child.id().to_string()])
        .status()
        .expect("kill is there");
    assert!(stopped.success());
    let ended = child.wait_with_output().expect("it ends");
    assert_eq!(ended.status.code(), Some(130), "{}", text(&ended.stderr));
    let part: serde_json::Value = serde_json::from_slice(&ended.stdout).expect("it is JSON");
    assert!(part["complete"] == false, "{part}");
    assert_eq!(json(&folder, &["--resume", "state.json"]), whole);
    // A finished search is told again without work.
    assert_eq!(json(&folder, &["--resume", "state.json"]), whole);
    // Another joint, goal or seed is another search.
    for other in [&["--seed", "2"][..], &["--for", "resistance"]] {
        let assert = ringsum(&folder)
            .args([
                "arrange",
                "lid.toml",
                "--solve",
                "2",
                "--resume",
                "state.json",
            ])
            .args(other)
            .assert()
            .code(2);
        assert!(text(&assert.get_output().stderr).contains("belongs to another joint"));
    }
    let changed = JOINT.replace("5 mm", "6 mm");
    fs::write(folder.path().join("lid.toml"), changed).expect("it can be written");
    ringsum(&folder)
        .args([
            "arrange",
            "lid.toml",
            "--solve",
            "2",
            "--resume",
            "state.json",
        ])
        .assert()
        .code(2);
    fs::write(&state, "{").expect("it can be written");
    let assert = ringsum(&folder)
        .args(["arrange", "lid.toml", "--resume", "state.json"])
        .assert()
        .code(2);
    assert!(text(&assert.get_output().stderr).contains("is no checkpoint"));
}

#[test]
fn what_cannot_be_searched_is_refused_with_the_way_out() {
    for (from, to, told) in [
        ("require = { rise = \"6 K\" }", "", "need a requirement"),
        (
            "torque = \"2 N·m\"",
            "torque = \"9 N·m\"",
            "no fastener bears its torque",
        ),
        (
            "step = \"8 mm\"",
            "edge_distance = \"30 mm\"",
            "no layout keeps",
        ),
    ] {
        let folder = tempdir().expect("there is a folder");
        fs::write(folder.path().join("lid.toml"), JOINT.replace(from, to)).expect("written");
        let assert = ringsum(&folder)
            .args(["arrange", "lid.toml"])
            .assert()
            .code(2);
        let stderr = text(&assert.get_output().stderr);
        assert!(stderr.contains(told) && stderr.contains("help"), "{stderr}");
    }
}
