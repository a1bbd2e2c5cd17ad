//! Tables beside a joint file: found from its folder, told with their own place.

use std::fs;

use snapbox::str;
use tempfile::{TempDir, tempdir};

use crate::{names, ringsum, stderr, stdout, within};

const TABLE: &str = "x [mm], y [mm], z [µm]\n0, 0, 0\n80, 0, 3\n80, 60, 9\n0, 60, 2\n";

/// A folder `lab` with a joint that names a table beside it.
fn lab(table: &str) -> TempDir {
    let folder = tempdir().expect("a folder can be made");
    let lab = folder.path().join("lab");
    fs::create_dir(&lab).expect("a folder can be made");
    let joint = r#"
[service]
medium = "vacuum"
[[plate]]
name = "box"
material = "Al 6061-T6"
thickness = "5 mm"
size = ["80 mm", "60 mm"]
finish = "milled"
flatness_map = "face.csv"
[[plate]]
name = "panel"
material = "Al 6061-T6"
thickness = "5 mm"
size = ["80 mm", "60 mm"]
finish = "milled"
[fastener]
thread = "M4"
grade = "8.8"
head = "socket"
torque = "2 N·m"
at = ["40 mm", "30 mm"]
"#;
    fs::write(lab.join("joint.toml"), joint).expect("a file can be written");
    fs::write(lab.join("face.csv"), table).expect("a file can be written");
    folder
}

#[test]
fn a_table_is_found_beside_its_joint() {
    let folder = lab(TABLE);
    within(&folder)
        .args(["check", "lab/joint.toml"])
        .assert()
        .code(0)
        .stderr_eq("");
    // From standard input names count from the current folder.
    let joint = fs::read(folder.path().join("lab/joint.toml")).expect("the test wrote it");
    let check = |at: &str| {
        ringsum()
            .current_dir(folder.path().join(at))
            .args(["check", "-"])
            .stdin(joint.clone())
            .assert()
    };
    check("lab").code(0);
    let missing = stderr(&check(".").code(2));
    assert!(missing.contains("map/unreadable"), "{missing}");
    assert!(missing.contains("there is no file `face.csv`"), "{missing}");
}

#[test]
fn a_fault_in_a_table_names_the_table_from_here() {
    let folder = lab(&TABLE.replace("80, 60, 9", "80, 60, high"));
    within(&folder)
        .args(["check", "lab/joint.toml"])
        .assert()
        .code(2)
        .stdout_eq("")
        .stderr_eq(str![[r"
error[map/row]: `high` is not a number
 --> lab/face.csv:4:9
  |
4 | 80, 60, high
  |         ^^^^ expected a finite number without unit
  |
  = help: leave out points that were not measured

"]]);
    let told = within(&folder)
        .args(["check", "lab/joint.toml", "--json"])
        .assert()
        .code(2);
    let told: serde_json::Value = serde_json::from_str(&stdout(&told)).expect("one object");
    let fault = &told["faults"][0];
    assert_eq!(fault["file"], "lab/face.csv");
    assert_eq!((&fault["line"], &fault["column"]), (&4.into(), &9.into()));
}

#[test]
fn what_is_no_table_is_refused_with_the_reason() {
    let folder = lab(TABLE);
    let table = folder.path().join("lab/face.csv");
    let refused = |why: &str| {
        let told = within(&folder).args(["check", "lab/joint.toml"]).assert();
        let told = stderr(&told.code(2));
        assert!(
            told.contains("map/unreadable") && told.contains(why),
            "{told}"
        );
    };
    fs::write(&table, b"x [mm], y [mm], z [\xb5m]\n").expect("a file can be written");
    refused("it is not UTF-8 text (line 1)");
    fs::write(&table, vec![b'#'; ringsum::joint::LONGEST_TABLE + 1]).expect("room is there");
    refused("it is larger than 10 MB");
    fs::remove_file(&table).expect("the test wrote it");
    fs::create_dir(&table).expect("a folder can be made");
    refused("it is a folder");
    fs::remove_dir(&table).expect("the test made it");
    refused("there is no file `lab/face.csv`");
    assert_eq!(names(&folder.path().join("lab")), ["joint.toml"]);
}

#[test]
fn the_cone_refuses_what_it_cannot_carry() {
    let folder = lab(TABLE);
    let estimate = |more: &[&str]| {
        within(&folder)
            .args([
                "estimate",
                "lab/joint.toml",
                "--field",
                "cone",
                "--draws",
                "0",
            ])
            .args(more)
            .assert()
            .code(2)
    };
    let refused = estimate(&["--set", "contact.faces=stuck"]);
    let told = stderr(&refused.stdout_eq(""));
    for part in [
        "plate.box.flatness_map",
        "contact.faces",
        "leave out `--field cone`",
        "pressure/beyond-cone",
    ] {
        assert!(told.contains(part), "{part}: {told}");
    }
    let object = stdout(&estimate(&["--json"]));
    let object: serde_json::Value = serde_json::from_str(&object).expect("one object");
    assert_eq!(object["ok"], false);
    assert_eq!(object["file"], "lab/joint.toml");
    // A bow in its place is passed over with a caution.
    within(&folder)
        .args(["estimate", "lab/joint.toml", "--field", "cone"])
        .args(["--draws", "0", "--set"])
        .arg("plate.box.bow={ kind = \"convex\", height = \"9 µm\" }")
        .assert()
        .code(0);
}
