//! The command line: what it prints where, how it ends, what it leaves on disk.

#[path = "cli/batch.rs"]
mod batch;
#[path = "cli/compare.rs"]
mod compare;
#[path = "cli/demos.rs"]
mod demos;
#[path = "cli/drivers.rs"]
mod drivers;
#[path = "cli/fields.rs"]
mod fields;
#[path = "cli/handover.rs"]
mod handover;
#[path = "cli/tables.rs"]
mod tables;
#[path = "cli/units.rs"]
mod units;

use snapbox::{
    cmd::{Command, OutputAssert, cargo_bin},
    str,
};
use std::{fs, path::Path};
use tempfile::{TempDir, tempdir};

fn ringsum() -> Command {
    Command::new(cargo_bin!("ringsum"))
        .env_remove("CLICOLOR_FORCE")
        .env("NO_COLOR", "1")
        .env("COLUMNS", "100")
}

fn within(folder: &TempDir) -> Command {
    ringsum().current_dir(folder.path())
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(folder)
        .expect("the test set this up")
        .map(|entry| {
            entry
                .expect("the test set this up")
                .file_name()
                .into_string()
                .expect("the test set this up")
        })
        .collect();
    names.sort();
    names
}

fn stdout(assert: &OutputAssert) -> String {
    String::from_utf8(assert.get_output().stdout.clone()).expect("the test set this up")
}

fn stderr(assert: &OutputAssert) -> String {
    String::from_utf8(assert.get_output().stderr.clone()).expect("the test set this up")
}

#[test]
fn without_arguments_three_lines_lead_to_a_result() {
    ringsum()
        .assert()
        .code(0)
        .stdout_eq(str![[r"
ringsum new --from-demo sensor_lid | ringsum estimate -   tells a resistance: low, nominal, high
ringsum new joint.toml                                    writes a starter joint to edit
ringsum --help                                            lists every command

"]])
        .stderr_eq("");
}

#[test]
fn help_lists_the_commands_and_hides_those_for_packagers() {
    let help = stdout(&ringsum().arg("--help").assert().code(0).stderr_eq(""));
    for command in [
        "new", "check", "estimate", "compare", "torque", "drivers", "draw", "fit", "list",
        "explain",
    ] {
        assert!(
            help.contains(&format!("\n  {command}")),
            "{command}:\n{help}"
        );
    }
    for hidden in ["completions", "man", "schema"] {
        assert!(
            !help.contains(&format!("\n  {hidden}")),
            "{hidden}:\n{help}"
        );
    }
    assert!(help.contains("Exit codes"), "{help}");
}

#[test]
fn every_command_has_help_and_usage_errors_go_to_standard_error() {
    for command in [
        "new",
        "check",
        "estimate",
        "compare",
        "torque",
        "drivers",
        "draw",
        "fit",
        "list",
        "explain",
        "completions",
        "man",
        "schema",
    ] {
        ringsum()
            .args([command, "--help"])
            .assert()
            .code(0)
            .stderr_eq("");
        let wrong = ringsum()
            .args([command, "--nonsense"])
            .assert()
            .code(2)
            .stdout_eq("");
        assert!(stderr(&wrong).contains("--nonsense"));
    }
    for command in [
        "check", "estimate", "compare", "torque", "drivers", "draw", "fit",
    ] {
        ringsum().arg(command).assert().code(2).stdout_eq("");
    }
}

#[test]
fn an_unknown_command_is_a_usage_error_with_the_nearest_one() {
    let wrong = ringsum().arg("estimat").assert().code(2).stdout_eq("");
    assert!(stderr(&wrong).contains("estimate"));
}

#[test]
fn the_version_is_that_of_the_package() {
    ringsum()
        .arg("--version")
        .assert()
        .code(0)
        .stdout_eq(format!("ringsum {}\n", env!("CARGO_PKG_VERSION")));
}

#[test]
fn a_missing_file_is_named_with_the_way_on() {
    let folder = tempdir().unwrap();
    for command in ["check", "estimate", "torque", "drivers"] {
        let missing = within(&folder)
            .args([command, "nowhere.toml"])
            .assert()
            .code(2)
            .stdout_eq("");
        let told = stderr(&missing);
        assert!(told.contains("file/not-found"), "{told}");
        assert!(told.contains("nowhere.toml"), "{told}");
        assert!(told.contains("ringsum new nowhere.toml"), "{told}");
    }
}

#[test]
fn a_mistyped_file_name_meets_its_neighbour() {
    let folder = tempdir().unwrap();
    fs::write(folder.path().join("converter.toml"), "x = 1").unwrap();
    fs::write(folder.path().join("box.toml"), "x = 1").unwrap();
    let short = within(&folder).args(["check", "box"]).assert().code(2);
    assert!(stderr(&short).contains("did you mean `box.toml`?"));
    for typed in ["convertor.toml", "converter"] {
        let missing = within(&folder).args(["check", typed]).assert().code(2);
        let told = stderr(&missing);
        assert!(told.contains("did you mean `converter.toml`?"), "{told}");
    }
}

#[test]
fn a_folder_an_empty_file_and_foreign_bytes_are_faults_of_the_file() {
    let folder = tempdir().unwrap();
    let write = |name: &str, bytes: &[u8]| fs::write(folder.path().join(name), bytes).unwrap();
    fs::create_dir(folder.path().join("folder")).unwrap();
    write("empty.toml", b"");
    write("blank.toml", b"\xEF\xBB\xBF \n\t\n");
    write("latin.toml", b"title = \"x\"\nthickness = \"5 \xB5m\"\n");
    write("wide.toml", b"\xFF\xFEt\0i\0");
    for (name, code, word) in [
        ("folder", "file/not-found", "folder"),
        ("empty.toml", "file/empty", "empty"),
        ("blank.toml", "file/empty", "empty"),
        ("latin.toml", "file/not-utf8", "0xB5 on line 2"),
        ("wide.toml", "file/not-utf8", "UTF-16"),
    ] {
        for command in ["check", "estimate"] {
            let told = stderr(
                &within(&folder)
                    .args([command, name])
                    .assert()
                    .code(2)
                    .stdout_eq(""),
            );
            assert!(told.contains(code) && told.contains(word), "{name}: {told}");
        }
    }
}

#[test]
fn a_file_beyond_one_megabyte_is_not_read() {
    let folder = tempdir().unwrap();
    fs::write(folder.path().join("huge.toml"), vec![b'#'; 1_000_001]).unwrap();
    let told = stderr(
        &within(&folder)
            .args(["check", "huge.toml"])
            .assert()
            .code(2),
    );
    assert!(told.contains("file/too-large"), "{told}");
    assert!(told.contains("1 MB"), "{told}");
}

#[test]
fn faults_in_json_stand_on_standard_output() {
    let folder = tempdir().unwrap();
    let assert = within(&folder)
        .args(["check", "--json", "nowhere.toml"])
        .assert()
        .code(2);
    let object: serde_json::Value = serde_json::from_str(&stdout(&assert)).unwrap();
    assert_eq!(object["ok"], false);
    assert_eq!(object["file"], "nowhere.toml");
    assert_eq!(object["faults"][0]["code"], "file/not-found");
    assert_eq!(object["faults"][0]["line"], 1);
}

#[test]
fn of_several_files_every_one_is_told_and_any_fault_is_a_failure() {
    let folder = tempdir().unwrap();
    let both = within(&folder)
        .args(["check", "one.toml", "two.toml"])
        .assert()
        .code(1);
    let told = stderr(&both);
    assert!(
        told.contains("one.toml") && told.contains("two.toml"),
        "{told}"
    );

    let lines = within(&folder)
        .args(["check", "--json", "one.toml", "two.toml"])
        .assert()
        .code(1);
    assert_eq!(stdout(&lines).lines().count(), 2, "one object per line");
}

#[test]
fn standard_input_has_a_name_and_is_read_once() {
    let empty = ringsum()
        .args(["estimate", "-"])
        .stdin("")
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&empty).contains("<stdin>"));
    let wrong = ringsum()
        .args(["check", "-"])
        .stdin("title = \n")
        .assert()
        .code(2);
    assert!(stderr(&wrong).contains("<stdin>"));
    ringsum()
        .args(["check", "-", "-"])
        .stdin("x = 1")
        .assert()
        .code(2)
        .stdout_eq("");
}

#[test]
fn numbers_beyond_their_range_are_usage_errors() {
    for arguments in [
        ["estimate", "x.toml", "--draws", "-1"],
        ["estimate", "x.toml", "--draws", "99999999"],
        ["estimate", "x.toml", "--seed", "one"],
        ["torque", "x.toml", "--steps", "1"],
        ["torque", "x.toml", "--group", "0"],
        ["torque", "x.toml", "--from", "1.7"],
        ["torque", "x.toml", "--to", "3 mm"],
    ] {
        ringsum().args(arguments).assert().code(2).stdout_eq("");
    }
    let told = stderr(
        &ringsum()
            .args(["torque", "x.toml", "--from", "2 N·m", "--to", "1 N·m"])
            .assert()
            .code(2),
    );
    assert!(told.contains("--from must be less than --to"), "{told}");
}

#[test]
fn a_starter_joint_is_written_once_and_replaced_on_request() {
    let folder = tempdir().unwrap();
    let printed = stdout(&ringsum().arg("new").assert().code(0).stderr_eq(""));
    let first = within(&folder)
        .args(["new", "joint.toml"])
        .assert()
        .code(0)
        .stdout_eq("");
    assert!(stderr(&first).contains("ringsum estimate joint.toml"));
    let path = folder.path().join("joint.toml");
    assert_eq!(fs::read_to_string(&path).unwrap(), printed);

    fs::write(&path, "mine").unwrap();
    let refused = within(&folder)
        .args(["new", "joint.toml"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&refused).contains("--force"));
    assert_eq!(fs::read_to_string(&path).unwrap(), "mine");

    within(&folder)
        .args(["new", "joint.toml", "--force"])
        .assert()
        .code(0);
    assert_eq!(fs::read_to_string(&path).unwrap(), printed);
    assert_eq!(
        names(folder.path()),
        ["joint.toml"],
        "no temporary file is left"
    );
}

#[test]
fn a_target_that_cannot_be_written_is_refused_before_anything_is_computed() {
    let folder = tempdir().unwrap();
    fs::create_dir(folder.path().join("folder")).unwrap();
    fs::write(folder.path().join("there.svg"), "kept").unwrap();
    for (out, word) in [
        ("folder", "is a folder"),
        ("absent/joint.toml", "no folder"),
    ] {
        let refused = within(&folder)
            .args(["new", out])
            .assert()
            .code(2)
            .stdout_eq("");
        assert!(stderr(&refused).contains(word), "{}", stderr(&refused));
    }
    // The joint does not exist: were it read first, the message would name it.
    for (out, word) in [
        ("there.svg", "exists already"),
        ("curve.pdf", "neither .svg nor .png"),
        ("curve", "neither .svg nor .png"),
        ("absent/curve.svg", "no folder"),
    ] {
        let refused = within(&folder)
            .args(["torque", "x.toml", "--draw", out])
            .assert()
            .code(2);
        assert!(
            stderr(&refused).contains(word),
            "{out}: {}",
            stderr(&refused)
        );
    }
    let refused = within(&folder)
        .args(["draw", "x.toml", "--out", "there.svg"])
        .assert()
        .code(2);
    assert!(
        stderr(&refused).contains("is a file"),
        "{}",
        stderr(&refused)
    );
    fs::write(folder.path().join("folder/pressure.svg"), "kept").unwrap();
    let refused = within(&folder)
        .args(["draw", "x.toml", "--out", "folder"])
        .assert()
        .code(2);
    assert!(
        stderr(&refused).contains("exists already"),
        "{}",
        stderr(&refused)
    );
    assert_eq!(names(folder.path()), ["folder", "there.svg"]);
}

#[test]
fn colour_is_plain_when_piped_and_forced_on_request() {
    let told = |choice: &[&str]| {
        let assert = ringsum()
            .args(["check", "nowhere.toml"])
            .args(choice)
            .assert()
            .code(2);
        stderr(&assert)
    };
    assert!(!told(&[]).contains('\u{1b}'));
    assert!(!told(&["--color", "never"]).contains('\u{1b}'));
    assert!(
        told(&["--color", "always"]).contains('\u{1b}'),
        "a request beats NO_COLOR"
    );
    let usage = ringsum()
        .args(["--color=always", "nonsense"])
        .assert()
        .code(2);
    assert!(stderr(&usage).contains('\u{1b}'), "usage errors too");
}

#[test]
fn codes_are_listed_and_explained_and_a_slip_is_mended() {
    let list = stdout(&ringsum().arg("explain").assert().code(0).stderr_eq(""));
    assert!(list.contains("code"), "{list}");
    ringsum()
        .args(["explain", "no/such-code-at-all"])
        .assert()
        .code(2)
        .stdout_eq("");
    let object = stdout(&ringsum().args(["explain", "--json"]).assert().code(0));
    serde_json::from_str::<serde_json::Value>(&object).unwrap();
}

#[test]
fn completions_and_manual_pages_come_from_the_same_description() {
    for shell in ["bash", "zsh", "fish"] {
        let script = stdout(&ringsum().args(["completions", shell]).assert().code(0));
        assert!(script.contains("estimate"), "{shell}");
    }
    let page = stdout(&ringsum().arg("man").assert().code(0));
    assert!(page.starts_with(".ie") || page.contains(".TH"), "{page}");
    let page = stdout(&ringsum().args(["man", "estimate"]).assert().code(0));
    assert!(page.contains("strict"), "{page}");
    ringsum()
        .args(["man", "nonsense"])
        .assert()
        .code(2)
        .stdout_eq("");
}

#[cfg(unix)]
#[test]
fn a_reader_that_leaves_early_is_no_failure_and_a_full_disk_is_one() {
    use std::process::{Command, Stdio};
    let mut child = Command::new(cargo_bin!("ringsum"))
        .arg("new")
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    drop(child.stdout.take());
    let ended = child.wait_with_output().unwrap();
    assert!(ended.status.success(), "{ended:?}");
    assert!(ended.stderr.is_empty(), "{ended:?}");

    if let Ok(full) = fs::OpenOptions::new().write(true).open("/dev/full") {
        let ended = Command::new(cargo_bin!("ringsum"))
            .arg("new")
            .stdout(full)
            .output()
            .unwrap();
        assert_eq!(ended.status.code(), Some(1), "{ended:?}");
    }
}

#[cfg(unix)]
#[test]
fn arguments_that_are_no_text_do_not_bring_it_down() {
    use std::{ffi::OsStr, os::unix::ffi::OsStrExt};
    let odd = OsStr::from_bytes(b"\xFF\xFE.toml");
    for command in ["check", "estimate", "torque", "drivers"] {
        ringsum()
            .arg(command)
            .arg(odd)
            .assert()
            .code(2)
            .stdout_eq("");
    }
    for arguments in [["explain"], ["list"], ["completions"], ["man"]] {
        ringsum()
            .args(arguments)
            .arg(odd)
            .assert()
            .code(2)
            .stdout_eq("");
    }
    ringsum()
        .args(["estimate", "x.toml", "--set"])
        .arg(odd)
        .assert()
        .code(2)
        .stdout_eq("");
    ringsum().arg(odd).assert().code(2).stdout_eq("");
}

/// A folder with the starter joint in it.
fn starter() -> TempDir {
    let folder = tempdir().expect("the test set this up");
    within(&folder).args(["new", "joint.toml"]).assert().code(0);
    folder
}

fn json(assert: &OutputAssert) -> serde_json::Value {
    serde_json::from_str(&stdout(assert)).expect("the test set this up")
}

/// Few draws on the closed form: these tests look at the plumbing, not at the digits.
const FEW: [&str; 4] = ["--draws", "32", "--field", "cone"];

#[test]
fn the_starter_joint_is_accepted_as_it_stands() {
    let folder = starter();
    let checked = within(&folder)
        .args(["check", "joint.toml"])
        .assert()
        .code(0)
        .stderr_eq("");
    assert!(stdout(&checked).starts_with("joint.toml: ok, 2 plates, 4 bolts"));
    let told = within(&folder)
        .args(["estimate", "joint.toml"])
        .args(FEW)
        .assert()
        .code(0);
    let report = stdout(&told.stderr_eq(""));
    assert!(report.starts_with("Box on panel\n"), "{report}");
    assert!(
        report.contains("contact only") && report.contains("source to sink"),
        "{report}"
    );
    assert!(!report.contains('\u{1b}'), "plain when piped");
    assert!(
        report.lines().all(|line| line.chars().count() <= 100),
        "{report}"
    );
}

#[test]
fn a_joint_from_standard_input_gives_the_same_numbers() {
    let folder = starter();
    let text = fs::read_to_string(folder.path().join("joint.toml")).unwrap();
    let of_file = within(&folder)
        .args(["estimate", "joint.toml"])
        .args(FEW)
        .assert()
        .code(0);
    let of_input = ringsum()
        .args(["estimate", "-"])
        .args(FEW)
        .stdin(text)
        .assert()
        .code(0);
    assert_eq!(stdout(&of_file), stdout(&of_input));
}

#[test]
fn json_is_one_object_with_the_contract_and_the_file() {
    let folder = starter();
    let arguments = ["estimate", "joint.toml", "--json", "--rings", "--seed", "5"];
    let told = within(&folder)
        .args(arguments)
        .args(FEW)
        .assert()
        .code(0)
        .stderr_eq("");
    let object = json(&told);
    assert_eq!(object["file"], "joint.toml");
    assert_eq!(object["seed"], 5);
    assert_eq!(object["draws"], 32);
    assert_eq!(object["bolts"].as_array().unwrap().len(), 4);
    assert_eq!(object["rings"].as_array().unwrap().len(), 4);
    let result = &object["results"]["source_to_sink"];
    let value = |side: &str, end: &str| result[side][end].as_f64().unwrap();
    // One division apart: the last digit alone may differ.
    assert!((value("resistance", "low") * value("conductance", "high") - 1.0).abs() < 1e-12);
    assert!(value("resistance", "low") <= value("resistance", "nominal"));
    assert!(value("resistance", "nominal") <= value("resistance", "high"));
}

#[test]
fn one_seed_gives_one_output_and_no_draws_give_no_band() {
    let folder = starter();
    let told = |arguments: &[&str]| {
        let command = within(&folder).args(["estimate", "joint.toml", "--json"]);
        let command = command.args(["--field", "cone"]);
        stdout(&command.args(arguments).assert().code(0))
    };
    let first = told(&["--draws", "32", "--seed", "3"]);
    assert_eq!(first, told(&["--draws", "32", "--seed", "3"]));
    assert_ne!(first, told(&["--draws", "32", "--seed", "4"]));
    let nominal: serde_json::Value = serde_json::from_str(&told(&["--draws", "0"])).unwrap();
    assert!(nominal["results"]["contact"]["resistance"]["low"].is_null());
}

#[test]
fn what_was_not_swept_is_null_and_not_false() {
    let told = |ends: &[&str]| {
        let program = ringsum()
            .args(["torque", "joints/power_module.toml", "--json"])
            .args("--field cone --draws 0 --steps 3".split(' '))
            .args(ends);
        json(&program.assert().success())["stated_stands"].clone()
    };
    // 3.5 N·m is stated, and meets the requirement.
    let beyond = told(&["--from", "3.675 N·m", "--to", "4.2 N·m"]);
    assert_eq!(beyond["requirement_met"], serde_json::Value::Null);
    assert_eq!(beyond["inside"], serde_json::Value::Null);
    let within = told(&["--from", "2 N·m", "--to", "4.2 N·m"]);
    assert_eq!(within["requirement_met"], true);
    assert_eq!(within["inside"], true);
}

#[test]
fn a_share_without_its_unit_is_told_with_one_that_is_taken() {
    let program = ringsum().args(["torque", "joints/power_module.toml", "--confidence", "0.9"]);
    let told = stderr(&program.assert().code(2));
    assert!(
        told.contains("\"90 %\"") && !told.contains("0.9 %"),
        "{told}"
    );
}

#[test]
fn cautions_end_with_three_only_when_strict() {
    let folder = starter();
    within(&folder)
        .args(["estimate", "joint.toml"])
        .args(FEW)
        .assert()
        .code(0);
    let strict = within(&folder)
        .args(["estimate", "joint.toml", "--strict"])
        .args(FEW);
    assert!(
        stdout(&strict.assert().code(3)).contains("cautions"),
        "the result stands"
    );
}

#[test]
fn an_override_changes_the_joint_and_a_wrong_one_is_pointed_at() {
    let folder = starter();
    let told = |set: &str| {
        let command = within(&folder).args(["estimate", "joint.toml", "--draws", "0"]);
        command.args(["--field", "cone", "--set", set]).assert()
    };
    let before = stdout(&told("title=\"Box on panel\"").code(0));
    let after = stdout(&told("plate.box.thickness=\"9 mm\"").code(0));
    assert_ne!(before, after);
    let wrong = told("plate.box.thicknes=\"9 mm\"").code(2).stdout_eq("");
    assert!(
        stderr(&wrong).contains("set/bad-override"),
        "{}",
        stderr(&wrong)
    );
    assert!(stderr(&wrong).contains("thickness"), "{}", stderr(&wrong));
}

#[test]
fn an_override_is_checked_without_computing() {
    let folder = starter();
    let told = |set: &str| {
        let command = within(&folder).args(["check", "joint.toml", "--set", set]);
        command.assert()
    };
    let good = stdout(&told("plate.box.thickness=\"9 mm\"").code(0));
    assert!(good.contains("ok"), "{good}");
    let wrong = told("plate.box.thickness=\"9\"").code(2).stdout_eq("");
    assert!(
        stderr(&wrong).contains("unit/bare-number"),
        "{}",
        stderr(&wrong)
    );
}

#[test]
fn a_batch_tells_every_file_and_fails_as_a_whole() {
    let folder = starter();
    let files = ["joint.toml", "absent.toml", "joint.toml"];
    let both = within(&folder)
        .arg("estimate")
        .args(files)
        .args(FEW)
        .assert()
        .code(1);
    assert_eq!(stdout(&both).matches("Box on panel\n").count(), 2);
    assert!(stderr(&both).contains("absent.toml"));
    let lines = within(&folder)
        .args(["estimate", "--json"])
        .args(files)
        .args(FEW)
        .assert()
        .code(1);
    let told = stdout(&lines);
    let objects: Vec<serde_json::Value> = told
        .lines()
        .map(|line| serde_json::from_str(line).unwrap())
        .collect();
    assert_eq!(
        objects.len(),
        3,
        "one object per line, in the order of the files"
    );
    assert_eq!(objects[1]["ok"], false);
    assert_eq!(objects[1]["faults"][0]["code"], "file/not-found");
}

#[test]
fn faults_are_all_told_with_their_places() {
    let folder = starter();
    let path = folder.path().join("joint.toml");
    let text = fs::read_to_string(&path).unwrap();
    let broken = text
        .replace("torque =", "torqe =")
        .replace("thickness = \"5 mm\"", "thickness = 5");
    fs::write(&path, &broken).unwrap();
    let told = within(&folder)
        .args(["check", "joint.toml", "--json"])
        .assert()
        .code(2);
    let object = json(&told);
    let faults = object["faults"].as_array().unwrap();
    let line = broken
        .lines()
        .position(|line| line.starts_with("torqe"))
        .unwrap()
        + 1;
    assert!(faults.iter().any(|fault| fault["line"] == line), "{object}");
    assert!(
        faults
            .iter()
            .any(|fault| fault["code"] == "unit/bare-number"),
        "{object}"
    );
    let shown = within(&folder)
        .args(["check", "joint.toml"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(
        stderr(&shown).contains(&format!("joint.toml:{line}:1")),
        "{}",
        stderr(&shown)
    );
}

#[test]
fn a_joint_that_opens_is_a_failure() {
    let folder = starter();
    let open = within(&folder)
        .args(["estimate", "joint.toml", "--draws", "0"])
        .args(["--field", "cone"])
        .args(["--set", "fastener.torque.value=\"0.01 N·m\""])
        .args([
            "--set",
            "service.temperature={ hot = \"-100 °C\", assembly = \"20 °C\" }",
        ])
        .assert()
        .code(1)
        .stdout_eq("");
    assert!(
        stderr(&open).contains("joint.toml: no clamp force is left"),
        "{}",
        stderr(&open)
    );
}

#[test]
fn a_torque_curve_is_told_and_drawn_without_leaving_anything_behind() {
    let folder = starter();
    let sweep = |out: &[&str]| {
        let command = within(&folder).args(["torque", "joint.toml", "--steps", "3"]);
        let command = command.args(["--draws", "20", "--field", "cone"]);
        command.args(out).assert()
    };
    let told = sweep(&["--draw", "curve.svg"]).code(0);
    assert!(stdout(&told).contains("N·m"));
    assert_eq!(stderr(&told), "wrote curve.svg\n");
    let drawn = fs::read_to_string(folder.path().join("curve.svg")).unwrap();
    assert!(drawn.starts_with("<svg"), "{}", &drawn[..40]);
    sweep(&["--draw", "curve.svg"]).code(2).stdout_eq("");
    sweep(&["--draw", "curve.svg", "--force"]).code(0);
    sweep(&["--draw", "CURVE.PNG"]).code(0);
    let bytes = fs::read(folder.path().join("CURVE.PNG")).unwrap();
    assert_eq!(&bytes[1..4], b"PNG");
    assert_eq!(
        names(folder.path()),
        ["CURVE.PNG", "curve.svg", "joint.toml"]
    );

    let object = json(&sweep(&["--json"]).code(0).stderr_eq(""));
    // Three steps, and the stated torque between them.
    assert_eq!(object["points"].as_array().unwrap().len(), 4);
    sweep(&["--group", "2"]).code(2).stdout_eq("");
}

#[test]
fn the_figures_of_a_joint_go_into_a_folder_of_their_own() {
    let folder = starter();
    let draw = |more: &[&str]| {
        let command = within(&folder).args(["draw", "joint.toml", "--out", "made/figures"]);
        command.args(["--field", "cone"]).args(more).assert()
    };
    draw(&["--format", "both"]).code(0).stdout_eq("");
    let made = folder.path().join("made/figures");
    assert_eq!(
        names(&made),
        [
            "conductance.png",
            "conductance.svg",
            "cumulative.png",
            "cumulative.svg",
            "pressure.png",
            "pressure.svg",
        ]
    );
    draw(&[]).code(2).stdout_eq("");
    draw(&["--force"]).code(0);
}

#[test]
fn the_catalogue_is_listed_filtered_and_told_in_full() {
    let kinds = stdout(&ringsum().arg("list").assert().code(0).stderr_eq(""));
    for kind in ["materials", "finishes", "threads", "grades", "fillers"] {
        assert!(kinds.contains(kind), "{kinds}");
    }
    let some = stdout(
        &ringsum()
            .args(["list", "material", "7075"])
            .assert()
            .code(0),
    );
    assert!(
        some.contains("Al 7075-T6") && !some.contains("304"),
        "{some}"
    );
    let one = stdout(&ringsum().args(["list", "6061-t6"]).assert().code(0));
    // Value, spread, status and source of the record that is left.
    assert!(
        one.contains("167 W/(m·K) (155 W/(m·K) to 180 W/(m·K))"),
        "{one}"
    );
    assert!(one.contains("seen: material data sheet"), "{one}");
    let object = json(
        &ringsum()
            .args(["list", "gases", "helium", "--json"])
            .assert()
            .code(0),
    );
    assert_eq!(object["kinds"]["gases"][0]["name"], "helium");
    ringsum()
        .args(["list", "materials", "unobtainium"])
        .assert()
        .code(2)
        .stdout_eq("");
}

#[test]
fn a_code_is_explained_with_what_to_do() {
    let page = stdout(
        &ringsum()
            .args(["explain", "Preload/Over-Yield"])
            .assert()
            .code(0),
    );
    assert!(page.starts_with("preload/over-yield"), "{page}");
    let law = stdout(&ringsum().args(["explain", "planes"]).assert().code(0));
    assert!(law.contains("node to node"), "{law}");
    let slip = ringsum()
        .args(["explain", "preload/over-yeild"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&slip).contains("preload/over-yield"));
}

#[test]
fn every_code_the_command_line_gives_is_explained() {
    for code in [
        "file/not-found",
        "file/not-utf8",
        "file/empty",
        "file/too-large",
    ] {
        ringsum().args(["explain", code]).assert().code(0);
    }
}

#[test]
fn the_schema_is_a_schema() {
    let object = json(&ringsum().arg("schema").assert().code(0));
    assert_eq!(object["$schema"], "http://json-schema.org/draft-07/schema#");
}

#[test]
fn a_report_is_coloured_on_request_and_says_the_same() {
    let folder = starter();
    let told = |choice: &str| {
        let command = within(&folder).args(["estimate", "joint.toml", "--draws", "0"]);
        let command = command.args(["--field", "cone"]);
        stdout(&command.args(["--color", choice]).assert().code(0))
    };
    let (plain, coloured) = (told("never"), told("always"));
    assert_ne!(plain, coloured);
    assert_eq!(anstream::adapter::strip_str(&coloured).to_string(), plain);
}

#[test]
fn a_sweep_that_the_joint_cannot_take_is_a_usage_error() {
    let folder = starter();
    let path = folder.path().join("joint.toml");
    let text = fs::read_to_string(&path).unwrap();
    let given: Vec<&str> = text
        .lines()
        .filter(|line| !line.starts_with("friction"))
        .map(|line| {
            if line.starts_with("torque") {
                "preload = \"2 kN\""
            } else {
                line
            }
        })
        .collect();
    fs::write(&path, given.join("\n")).unwrap();
    within(&folder)
        .args(["check", "joint.toml"])
        .assert()
        .code(0);
    let told = within(&folder)
        .args(["torque", "joint.toml", "--draws", "0", "--field", "cone"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&told).contains("preload"), "{}", stderr(&told));
}
