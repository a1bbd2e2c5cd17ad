//! Answers are told though a file of theirs fails; files are written though nobody reads the answer.

use super::{LID, folder_with, names, refused, ringsum, told};
use std::{
    fs,
    path::Path,
    process::{Command, Output},
};
use tempfile::TempDir;

const COUPON: &str = include_str!("../../joints/rig_coupon.toml");
const POINTS: &str = include_str!("../../joints/rig_coupon_points.csv");
const TORQUES: &str = include_str!("../../joints/rig_coupon_torque.csv");

fn run(folder: &TempDir, arguments: &str) -> Output {
    command(folder, arguments)
        .output()
        .expect("the test can do this")
}

/// The arguments by blanks, with `~` for a blank in one.
fn command(folder: &TempDir, arguments: &str) -> Command {
    let mut command = ringsum(folder);
    command.args(arguments.split(' ').map(|word| word.replace('~', " ")));
    command
}

/// The same with a reader of its results who has gone.
fn unread(folder: &TempDir, arguments: &str) -> Output {
    let (reader, writer) = std::io::pipe().expect("the test can do this");
    drop(reader);
    command(folder, arguments)
        .stdout(writer)
        .output()
        .expect("the test can do this")
}

fn coupon() -> TempDir {
    let folder = folder_with(COUPON);
    fs::write(folder.path().join("points.csv"), POINTS).expect("the test can do this");
    fs::write(folder.path().join("torques.csv"), TORQUES).expect("the test can do this");
    folder
}

/// A folder of the system that takes no file, whoever asks.
const NO_FOLDER: &str = "/proc";

#[test]
fn an_answer_is_told_though_its_file_cannot_be_written() {
    if !Path::new(NO_FOLDER).is_dir() {
        println!("skipped: there is no {NO_FOLDER}");
        return;
    }
    let folder = coupon();
    for arguments in [
        "estimate joint.toml --resolution fast --draws 0 --nodes /proc/x.csv",
        "torque joint.toml --field cone --draws 0 --steps 3 --draw /proc/x.svg",
        "drivers joint.toml --field cone --draws 256 --draw /proc/x.svg",
        "compare joint.toml joint.toml --field cone --draws 0 --no-loss --draw /proc/x.svg",
        "fit points.csv --draw /proc/x.svg",
        "fit points.csv --out /proc/x.toml",
        "fit joint.toml torques.csv --unknown roughness --field cone --draws 0 --draw /proc/x.svg",
    ] {
        for json in ["", " --json"] {
            let output = run(&folder, &format!("{arguments}{json}"));
            let said = told(&output);
            assert_eq!(output.status.code(), Some(1), "{arguments}{json}: {said}");
            assert!(output.stdout.len() > 300, "{arguments}{json} tells nothing");
            assert!(said.contains("/proc/x."), "{arguments}{json}: {said}");
            assert!(!said.contains(".ringsum-"), "{arguments}{json}: {said}");
        }
    }
}

#[test]
fn files_are_written_though_nobody_reads_the_answer() {
    let folder = coupon();
    fs::copy(
        folder.path().join("points.csv"),
        folder.path().join("again.csv"),
    )
    .expect("the test can do this");
    for (arguments, written) in [
        ("fit points.csv --out one.toml", &["one.toml"][..]),
        (
            "fit points.csv again.csv --out many",
            &["many/again.toml", "many/points.toml"],
        ),
        (
            "fit points.csv again.csv --out side --jobs 2",
            &["side/again.toml", "side/points.toml"],
        ),
        (
            "torque joint.toml --field cone --draws 0 --steps 3 --draw curve.svg",
            &["curve.svg"],
        ),
        (
            "estimate joint.toml --resolution fast --draws 0 --nodes nodes.csv",
            &["nodes.csv"],
        ),
    ] {
        let output = unread(&folder, arguments);
        assert!(output.status.success(), "{arguments}: {output:?}");
        for file in written {
            assert!(folder.path().join(file).is_file(), "{arguments}: {file}");
        }
    }
}

#[test]
fn a_fault_counts_though_nobody_reads_the_rest() {
    let folder = coupon();
    let output = unread(&folder, "check absent.toml joint.toml");
    assert!(told(&output).contains("absent.toml"), "{output:?}");
    assert_eq!(output.status.code(), Some(1), "{output:?}");
    assert!(
        unread(&folder, "check joint.toml joint.toml")
            .status
            .success()
    );
}

#[test]
fn what_is_read_is_never_written_over() {
    let folder = coupon();
    for arguments in [
        "fit points.csv --out points.csv --force",
        "estimate joint.toml --nodes joint.toml --force",
        "arrange joint.toml --checkpoint joint.toml --force",
        "fit joint.toml torques.csv --unknown roughness --draw ./torques.csv --force",
    ] {
        let arguments: Vec<&str> = arguments.split(' ').collect();
        refused(&folder, &arguments, &[]);
    }
    refused(
        &folder,
        &[
            "estimate",
            "joint.toml",
            "--field",
            "cone",
            "--nodes",
            "n.csv",
        ],
        &["has no nodes"],
    );
    let read = |name: &str| fs::read_to_string(folder.path().join(name)).expect("it is there");
    // A table that the joint file names.
    let text = include_str!("../../joints/bowed_base.toml");
    let map = include_str!("../../joints/bowed_base_flatness.csv");
    fs::write(folder.path().join("bowed.toml"), text).expect("the test can do this");
    fs::write(folder.path().join("bowed_base_flatness.csv"), map).expect("the test can do this");
    refused(
        &folder,
        &[
            "estimate",
            "bowed.toml",
            "--nodes",
            "bowed_base_flatness.csv",
            "--force",
        ],
        &["which is read"],
    );
    assert_eq!(read("bowed_base_flatness.csv"), map);
    fs::remove_file(folder.path().join("bowed.toml")).expect("the test can do this");
    fs::remove_file(folder.path().join("bowed_base_flatness.csv")).expect("the test can do this");
    assert_eq!(read("points.csv"), POINTS);
    assert_eq!(read("joint.toml"), COUPON);
    assert_eq!(
        names(folder.path()),
        ["joint.toml", "points.csv", "torques.csv"]
    );
}

#[test]
fn a_folder_of_results_counts_what_was_written() {
    let folder = folder_with(LID);
    fs::write(folder.path().join("other.toml"), LID).expect("the test can do this");
    // The system lets no file grow beyond some kilobytes: the table has room, the results have not.
    let script = format!(
        "ulimit -f 8; trap '' XFSZ; exec '{}' estimate joint.toml other.toml --field cone --draws 0 --out out",
        super::RINGSUM
    );
    let output = Command::new("sh")
        .current_dir(folder.path())
        .args(["-c", &script])
        .output()
        .expect("the test can do this");
    let said = told(&output);
    assert_eq!(output.status.code(), Some(1), "{said}");
    assert!(said.contains("and 0 JSON beside it"), "{said}");
    let table = fs::read_to_string(folder.path().join("out/estimates.csv")).expect("it is there");
    assert_eq!(table.matches(",done,").count(), 2, "{table}");
}

#[test]
fn parts_of_many_tables_go_where_the_whole_would() {
    let folder = coupon();
    for part in ["1/2", "2/2"] {
        let output = run(
            &folder,
            &format!("fit points.csv torques.csv --shard {part} --out blocks"),
        );
        assert!(!told(&output).contains("blocks` is"), "{output:?}");
    }
    assert!(folder.path().join("blocks/points.toml").is_file());
    refused(
        &folder,
        &[
            "fit",
            "points.csv",
            "torques.csv",
            "--shard",
            "1/2",
            "--draw",
            "x.svg",
        ],
        &["--draw draws one joint, and 2 are named"],
    );
}

#[test]
fn options_that_would_do_nothing_are_refused() {
    let folder = coupon();
    for option in [
        "--field cone",
        "--resolution fast",
        "--memory 1GB",
        "--case 2",
        "--seed 9",
        "--draws 0",
    ] {
        let arguments = format!("fit points.csv {option}");
        let arguments: Vec<&str> = arguments.split(' ').collect();
        refused(&folder, &arguments, &["--unknown"]);
    }
    for option in ["--brief", "--full"] {
        refused(
            &folder,
            &["estimate", "joint.toml", "--json", option],
            &["cannot be used with"],
        );
    }
}

#[test]
fn files_in_the_wrong_places_are_told_apart() {
    let folder = coupon();
    refused(
        &folder,
        &["fit", "torques.csv", "joint.toml", "--unknown", "roughness"],
        &["`torques.csv` stands where the joint file belongs"],
    );
    refused(
        &folder,
        &["fit", "joint.toml"],
        &["`joint.toml` is a joint file, and no unknown of it is asked for"],
    );
}

#[test]
fn what_no_sheet_holds_is_not_drawn_in_part() {
    let variant =
        |place| format!("\n[[variant]]\nname = \"number {place}\"\nservice.heat = \"5 W\"\n");
    let variants: String = (0..120).map(variant).collect();
    let folder = folder_with(LID.to_owned() + &variants);
    let output = run(
        &folder,
        "compare joint.toml --field cone --draws 0 --no-loss --draw many.svg",
    );
    assert_eq!(output.status.code(), Some(1), "{}", told(&output));
    assert!(
        told(&output).contains("4000 are the most"),
        "{}",
        told(&output)
    );
    assert!(output.stdout.len() > 3000, "the table tells them all");
    assert_eq!(names(folder.path()), ["joint.toml"]);
}
