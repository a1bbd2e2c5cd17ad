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
