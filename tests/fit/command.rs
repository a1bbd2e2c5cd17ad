//! The command itself: streams, files, exit codes, faults at their places.

use snapbox::cmd::{Command, OutputAssert, cargo_bin};
use std::{fs, path::Path};
use tempfile::{TempDir, tempdir};

const POINTS: &str = "pressure [MPa], h [W/(m²·K)]\n1, 5000\n2, 9400\n4, 17800\n8, 33000\n";

fn folder() -> TempDir {
    let folder = tempdir().expect("a folder");
    fs::write(folder.path().join("rig.csv"), POINTS).expect("written");
    folder
}

fn ringsum(folder: &Path) -> Command {
    Command::new(cargo_bin!("ringsum"))
        .env_remove("CLICOLOR_FORCE")
        .env("NO_COLOR", "1")
        .current_dir(folder)
}

fn streams(assert: &OutputAssert) -> (String, String) {
    let text = |bytes: &[u8]| String::from_utf8(bytes.to_vec()).expect("text");
    let output = assert.get_output();
    (text(&output.stdout), text(&output.stderr))
}

#[test]
fn a_law_is_printed_with_its_block() {
    let folder = folder();
    let (out, _) = streams(
        &ringsum(folder.path())
            .args(["fit", "rig.csv"])
            .assert()
            .code(0),
    );
    for line in [
        "  exponent ",
        "scatter factor",
        "[measured]",
        "points = [",
        "scatter = \"",
    ] {
        assert!(out.contains(line), "{line}\n{out}");
    }
    let piped = ringsum(folder.path())
        .args(["fit", "-"])
        .stdin(POINTS)
        .assert()
        .code(0);
    assert!(streams(&piped).0.contains("[measured]"));
}

#[test]
fn nothing_is_overwritten_without_force() {
    let folder = folder();
    let run = |more: &[&str]| {
        let common = ["fit", "rig.csv", "--out", "block.toml", "--draw", "fit.svg"];
        ringsum(folder.path()).args(common).args(more).assert()
    };
    run(&[]).code(0);
    let block = fs::read_to_string(folder.path().join("block.toml")).expect("written");
    assert!(block.starts_with("[measured]\n"), "{block}");
    assert!(
        fs::read_to_string(folder.path().join("fit.svg"))
            .expect("drawn")
            .starts_with("<svg")
    );
    assert!(streams(&run(&[]).code(2)).1.contains("exists already"));
    run(&["--force"]).code(0);
}

/// Each table is fitted as alone, blocks go to a folder, one at fault stops none of the others.
#[test]
fn many_tables_are_fitted_each_alone() {
    let folder = folder();
    fs::write(
        folder.path().join("other.csv"),
        POINTS.replace("33000", "35000"),
    )
    .expect("written");
    fs::write(folder.path().join("bad.csv"), "pressure [MPa]\n1\n").expect("written");
    let files = ["fit", "rig.csv", "bad.csv", "other.csv"];
    let run = |more: &[&str]| ringsum(folder.path()).args(files).args(more).assert();
    let (out, err) = streams(&run(&["--out", "blocks", "--jobs", "2"]).code(1));
    assert!(
        out.contains("rig.csv:\n") && out.contains("other.csv:\n"),
        "{out}"
    );
    assert!(err.contains("bad.csv:1:"), "{err}");
    for name in ["rig", "other"] {
        let alone = [
            "fit",
            &format!("{name}.csv"),
            "--out",
            &format!("{name}.toml"),
        ];
        ringsum(folder.path()).args(alone).assert().code(0);
        let read = |path: String| fs::read_to_string(folder.path().join(path)).expect("written");
        assert_eq!(
            read(format!("blocks/{name}.toml")),
            read(format!("{name}.toml"))
        );
    }
    assert!(!folder.path().join("blocks/bad.toml").exists());
    // What speaks of one table is asked of one.
    for more in [&["--without", "2"][..], &["--draw", "fit.svg"]] {
        run(more).code(2);
    }
    let (lines, _) = streams(&run(&["--json"]).code(1));
    assert_eq!(lines.lines().count(), 3, "{lines}");
}

#[test]
fn faults_of_a_table_are_told_at_their_places() {
    let folder = folder();
    fs::write(
        folder.path().join("bad.csv"),
        "pressure [MPa], h [W/(m²·K)]\n1, x\n-2, 3\n",
    )
    .expect("written");
    let (_, told) = streams(
        &ringsum(folder.path())
            .args(["fit", "bad.csv"])
            .assert()
            .code(2),
    );
    for piece in [
        "bad.csv:2:4",
        "bad.csv:3:1",
        "2 faults in bad.csv",
        "points/row",
    ] {
        assert!(told.contains(piece), "{piece}\n{told}");
    }
    let (out, _) = streams(
        &ringsum(folder.path())
            .args(["fit", "bad.csv", "--json"])
            .assert()
            .code(2),
    );
    assert!(
        serde_json::from_str::<serde_json::Value>(&out).is_ok(),
        "{out}"
    );
    for (arguments, says) in [
        (&["fit", "none.csv"][..], "there is no file"),
        (&["fit", "rig.csv", "--without", "9"], "holds no reading"),
        (
            &["fit", "rig.csv", "--branch", "unloading"],
            "no such branch",
        ),
        (
            &["fit", "rig.csv", "--unknown", "roughness"],
            "takes a joint file and a table",
        ),
        (&["fit", "lid.toml", "rig.csv"], "no unknown of it"),
        (
            &[
                "fit",
                "rig.csv",
                "--without",
                "2",
                "--without",
                "3",
                "--without",
                "4",
            ],
            "do not fix",
        ),
    ] {
        let (_, told) = streams(&ringsum(folder.path()).args(arguments).assert().code(2));
        assert!(told.contains(says), "{arguments:?}\n{told}");
    }
}

#[test]
fn strict_turns_cautions_into_three_and_left_out_lines_are_told() {
    let folder = folder();
    let rows: Vec<String> = (1..=10)
        .map(|at| {
            let wiggle = 1.0 + 0.01 * f64::from(at % 3 - 1);
            let apart = if at == 6 { 1.5 } else { 1.0 };
            format!(
                "{at}, {}\n",
                5000.0 * f64::from(at).powf(0.9) * wiggle * apart
            )
        })
        .collect();
    let rows = rows.concat();
    fs::write(
        folder.path().join("apart.csv"),
        format!("p [MPa], h [W/(m²·K)]\n{rows}"),
    )
    .expect("written");
    let run = |more: &[&str]| {
        ringsum(folder.path())
            .args(["fit", "apart.csv", "--strict"])
            .args(more)
            .assert()
    };
    let (out, _) = streams(&run(&[]).code(3));
    assert!(out.contains("fit/outlier: line 7 (6 MPa)"), "{out}");
    let (_, told) = streams(&run(&["--without", "7"]).code(0));
    assert!(
        told.contains("left out as told: line 7 of apart.csv"),
        "{told}"
    );
}

#[test]
fn an_unknown_is_fitted_by_a_path_and_its_json_says_whether_it_is_determined() {
    let folder = folder();
    fs::copy("joints/rig_coupon.toml", folder.path().join("joint.toml")).expect("copied");
    fs::write(
        folder.path().join("g.csv"),
        "torque [N·m], G [W/K], sigma [%]\n10, 20, 3\n20, 25, 3\n",
    )
    .expect("written");
    let run = |more: &[&str]| {
        let common = [
            "fit",
            "joint.toml",
            "g.csv",
            "--field",
            "cone",
            "--draws",
            "64",
        ];
        ringsum(folder.path()).args(common).args(more).assert()
    };
    let path = "plate.\"hot coupon\".finish.roughness";
    let ends = ["--from", "Ra 0.1 µm", "--to", "Ra 5 µm"];
    let (out, _) = streams(
        &run(&[&["--unknown", path, "--json", "--draw", "l.png"], &ends[..]].concat()).code(0),
    );
    let found: serde_json::Value = serde_json::from_str(&out).expect("JSON");
    assert_eq!(found["unknown"], path);
    assert!(found["interval"][0].as_f64().expect("a number") >= 0.1);
    assert!(folder.path().join("l.png").exists());
    for (more, says) in [
        (&["--unknown", "rougness"][..], "is no unknown"),
        (&["--unknown", path], "between which values"),
        (
            &["--unknown", path, "--from", "Ra 1 µm", "--to", "2 mm"],
            "not written alike",
        ),
        (
            &["--unknown", "slope", "--from", "0.3", "--to", "0.1"],
            "does not rise",
        ),
        (
            &[
                "--unknown",
                "plate.hut.bow",
                "--from",
                "1 µm",
                "--to",
                "2 µm",
            ],
            "set/bad-override",
        ),
        (&["--unknown", "roughness", "--case", "2"], "thermal case"),
        (&["--unknown", "filler"], "leaves nothing open"),
    ] {
        let (_, told) = streams(&run(more).code(2));
        assert!(told.contains(says), "{more:?}\n{told}");
    }
}
