//! Many files: jobs, parts, a folder of results.

use std::fs;

use serde_json::Value;
use tempfile::{TempDir, tempdir};

use crate::{names, stderr, stdout, within};

/// A folder with four sound joints and one at fault.
fn folder() -> TempDir {
    let folder = tempdir().expect("a folder");
    let demo = fs::read_to_string("joints/led_board.toml").expect("the demo is there");
    for (name, torque) in [("a", "0.5"), ("b", "0.6"), ("c", "0.7"), ("e", "0.8")] {
        let text = demo.replace("0.7 N·m", &format!("{torque} N·m"));
        fs::write(folder.path().join(format!("{name}.toml")), text).expect("it is written");
    }
    let bad = demo.replace("\"1.6 mm\"", "1.6");
    fs::write(folder.path().join("d.toml"), bad).expect("it is written");
    folder
}

const FILES: [&str; 5] = ["c.toml", "a.toml", "d.toml", "e.toml", "b.toml"];
const QUICK: [&str; 4] = ["--field", "cone", "--draws", "32"];

#[test]
fn any_number_of_jobs_prints_the_same_in_the_same_order() {
    let folder = folder();
    let run = |more: &[&str]| {
        let told = within(&folder)
            .arg("estimate")
            .args(FILES)
            .args(QUICK)
            .args(more)
            .assert()
            .code(1);
        (stdout(&told), stderr(&told))
    };
    for json in [&[][..], &["--json"]] {
        let alone = run(json);
        for jobs in ["1", "2", "7"] {
            assert_eq!(run(&[json, &["--jobs", jobs]].concat()), alone, "{jobs}");
        }
    }
}

#[test]
fn results_go_to_a_folder_and_one_bad_file_stops_nothing() {
    let folder = folder();
    let run = |more: &[&str]| {
        within(&folder)
            .arg("estimate")
            .args(FILES)
            .args(QUICK)
            .args(["--out", "results"])
            .args(more)
            .assert()
    };
    let told = run(&["--jobs", "2"]).code(1).stdout_eq("");
    assert!(stderr(&told).contains("d.toml"));
    let results = folder.path().join("results");
    let all = [
        "a.json",
        "b.json",
        "c.json",
        "d.json",
        "e.json",
        "estimates.csv",
    ];
    assert_eq!(names(&results), all);
    let table = fs::read_to_string(results.join("estimates.csv")).expect("it is text");
    let files: Vec<&str> = table
        .lines()
        .skip(1)
        .filter_map(|line| line.split(',').next())
        .collect();
    assert_eq!(files, FILES);
    assert!(table.contains("d.toml,faulty,unit/bare-number"), "{table}");
    let object = |name: &str| -> Value {
        let text = fs::read_to_string(results.join(name)).expect("it is text");
        serde_json::from_str(&text).expect("one object")
    };
    assert_eq!(object("d.json")["ok"], false);
    // The table says what the object says, to the last digit.
    let whole = object("a.json")["results"]["source_to_sink"]["resistance"]["nominal"].to_string();
    let row = table
        .lines()
        .find(|line| line.starts_with("a.toml"))
        .expect("a row");
    assert!(row.contains(&whole), "{whole} {row}");
    let before = table.clone();
    let told = run(&[]).code(2).stdout_eq("");
    assert!(stderr(&told).contains("--force replaces it"));
    run(&["--force"]).code(1);
    assert_eq!(
        fs::read_to_string(results.join("estimates.csv")).expect("text"),
        before
    );
}

#[test]
fn parts_of_a_batch_do_not_meet() {
    let folder = folder();
    for part in ["1/2", "2/2"] {
        within(&folder)
            .args(["estimate", "a.toml", "e.toml", "c.toml", "b.toml"])
            .args(QUICK)
            .args(["--out", "results", "--shard", part])
            .assert()
            .code(0);
    }
    let all = [
        "a.json",
        "b.json",
        "c.json",
        "e.json",
        "estimates_1_of_2.csv",
        "estimates_2_of_2.csv",
    ];
    assert_eq!(names(&folder.path().join("results")), all);
    let told = within(&folder)
        .args(["check", "e.toml", "a.toml", "c.toml", "--shard", "1/2"])
        .assert()
        .code(0);
    let told = stdout(&told);
    let order: Vec<&str> = told
        .lines()
        .filter_map(|line| line.split(':').next())
        .collect();
    assert_eq!(order, ["a.toml", "e.toml"]);
}

#[test]
fn files_of_one_name_are_not_written_over_each_other() {
    let folder = folder();
    fs::create_dir(folder.path().join("more")).expect("a folder");
    fs::copy(
        folder.path().join("a.toml"),
        folder.path().join("more/A.toml"),
    )
    .expect("a copy");
    let told = within(&folder)
        .args(["estimate", "a.toml", "more/A.toml", "--out", "results"])
        .args(QUICK)
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(
        stderr(&told).contains("would both be written"),
        "{}",
        stderr(&told)
    );
}

#[test]
fn torques_and_drivers_go_through_many_files_as_estimates_do() {
    let folder = folder();
    let more = [
        ("torque", &["--steps", "3", "--draws", "32"][..], "torques"),
        ("drivers", &["--draws", "256"], "drivers"),
    ];
    for (command, options, table) in more {
        let run = |more: &[&str]| {
            within(&folder)
                .arg(command)
                .args(FILES)
                .args(["--field", "cone"])
                .args(options)
                .args(more)
                .assert()
        };
        // Text and JSON of many files, in their order, whatever the jobs.
        let told = |more: &[&str]| stdout(&run(more).code(1));
        let alone = told(&[]);
        assert_eq!(told(&["--jobs", "3"]), alone);
        let at = |name: &str| alone.find(name).expect("the file is named");
        assert!(at("c.toml:") < at("a.toml:") && at("e.toml:") < at("b.toml:"));
        let lines: Vec<Value> = told(&["--json", "--jobs", "2"])
            .lines()
            .map(|line| serde_json::from_str(line).expect("one object to a line"))
            .collect();
        let files: Vec<&Value> = lines.iter().map(|each| &each["file"]).collect();
        assert_eq!(files, FILES);
        assert_eq!(lines[2]["ok"], false);
        // A folder of results with one table.
        let part = run(&["--out", command, "--jobs", "2"])
            .code(1)
            .stdout_eq("");
        assert!(stderr(&part).contains("d.toml"));
        let results = folder.path().join(command);
        let mut all: Vec<String> = ["a", "b", "c", "d", "e"]
            .map(|name| format!("{name}.json"))
            .to_vec();
        all.push(format!("{table}.csv"));
        all.sort();
        assert_eq!(names(&results), all);
        let rows = fs::read_to_string(results.join(format!("{table}.csv"))).expect("it is text");
        let mut files: Vec<&str> = rows
            .lines()
            .skip(1)
            .filter_map(|line| line.split(',').next())
            .collect();
        files.dedup();
        assert_eq!(files, FILES);
        // The table says what the object says, to the last digit.
        let text = fs::read_to_string(results.join("a.json")).expect("it is text");
        let object: Value = serde_json::from_str(&text).expect("one object");
        let value = match command {
            "torque" => &object["largest"]["torque"],
            _ => &object["inputs"][0]["total"]["value"],
        };
        assert!(value.is_number(), "{object}");
        let row = rows.lines().find(|line| line.starts_with("a.toml"));
        assert!(
            row.is_some_and(|row| row.contains(&value.to_string())),
            "{value} {row:?}"
        );
        run(&["--out", command]).code(2).stdout_eq("");
        run(&["--out", command, "--force", "--shard", "1/5"]).code(0);
        // One figure shows one joint.
        let refused = run(&["--draw", "figure.svg"]).code(2).stdout_eq("");
        assert!(stderr(&refused).contains("one joint"));
    }
    let figure = within(&folder)
        .args(["torque", "a.toml", "--out", "curve.svg"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&figure).contains("--draw FIGURE"));
}

#[test]
fn the_figures_of_several_joints_go_into_folders_of_their_own() {
    let folder = folder();
    let draw = |more: &[&str]| {
        within(&folder)
            .args(["draw", "a.toml", "d.toml", "b.toml", "--field", "cone"])
            .args(more)
            .assert()
    };
    let told = draw(&["--out", "figures", "--jobs", "2"]).code(1);
    assert!(stderr(&told).contains("d.toml"), "{}", stderr(&told));
    let figures = folder.path().join("figures");
    // The file at fault leaves no folder behind.
    assert_eq!(names(&figures), ["a", "b"]);
    let all = ["conductance.svg", "cumulative.svg", "pressure.svg"];
    assert_eq!(names(&figures.join("b")), all);
    let kept = draw(&["--out", "figures"]).code(2).stdout_eq("");
    assert!(stderr(&kept).contains("--force replaces it"));
    draw(&["--out", "figures", "--force"]).code(1);
    // A part of several keeps to the folders of the whole.
    draw(&["--out", "part", "--shard", "1/3"]).code(0);
    assert_eq!(names(&folder.path().join("part")), ["a"]);
    fs::create_dir(folder.path().join("more")).expect("a folder");
    let (from, to) = (
        folder.path().join("a.toml"),
        folder.path().join("more/A.toml"),
    );
    fs::copy(from, to).expect("a copy");
    let same = draw(&["more/A.toml", "--out", "other"]).code(2);
    assert!(stderr(&same).contains("would both be written"));
}
