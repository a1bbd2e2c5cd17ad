//! `drivers` and the draws: what is told, drawn and refused.

use std::fs;

use tempfile::{TempDir, tempdir};

use crate::{names, stderr, stdout, within};

/// The closed form with few draws: the digits are tested elsewhere.
const FEW: [&str; 5] = ["--draws", "512", "--field", "cone", "joint.toml"];

fn folder(joint: &str) -> TempDir {
    let folder = tempdir().expect("a folder can be made");
    fs::copy(joint, folder.path().join("joint.toml")).expect("a joint can be copied");
    folder
}

#[test]
fn drivers_are_ranked_with_shares_band_and_remedy() {
    let folder = folder("joints/rig_coupon.toml");
    let told = stdout(
        &within(&folder)
            .arg("drivers")
            .args(FEW)
            .assert()
            .code(0)
            .stderr_eq(""),
    );
    for part in [
        "share %",
        "in total",
        "known K/W",
        "less",
        "what to do about it",
        "seed 1",
    ] {
        assert!(told.contains(part), "{part}:\n{told}");
    }
    for line in told.lines() {
        assert!(line.chars().count() <= 100, "{line}");
    }
    let json = stdout(
        &within(&folder)
            .args(["drivers", "--json", "--of", "contact"])
            .args(FEW)
            .assert()
            .code(0),
    );
    let object: serde_json::Value = serde_json::from_str(&json).expect("JSON");
    assert_eq!(object["of"], "contact only");
    assert_eq!(object["unit"], "K/W");
    assert_eq!(object["draws"], 512);
    let inputs = object["inputs"].as_array().expect("inputs");
    assert!(inputs.len() > 5, "{object}");
    for input in inputs {
        for key in ["first", "total"] {
            assert!(input[key]["value"].is_number(), "{key}: {input}");
            assert!(input[key]["confidence"].is_number(), "{key}: {input}");
        }
        assert!(
            input["alone"][1].is_number() && input["known"]["high"].is_number(),
            "{input}"
        );
        assert!(!input["remedy"].as_str().expect("words").is_empty());
    }
}

#[test]
fn the_bars_are_drawn_and_nothing_is_overwritten() {
    let folder = folder("joints/rig_coupon.toml");
    let draw = |name: &str, more: &[&str]| {
        within(&folder)
            .args(["drivers", "--draw", name])
            .args(more)
            .args(FEW)
            .assert()
    };
    let first = draw("bars.svg", &[]).code(0);
    assert!(stderr(&first).contains("wrote bars.svg"));
    draw("bars.svg", &[]).code(2).stdout_eq("");
    draw("bars.svg", &["--force"]).code(0);
    draw("bars.png", &[]).code(0);
    draw("bars.pdf", &[]).code(2).stdout_eq("");
    assert_eq!(names(folder.path()), ["bars.png", "bars.svg", "joint.toml"]);
    let svg = fs::read_to_string(folder.path().join("bars.svg")).expect("a figure");
    assert!(
        svg.starts_with("<svg") && svg.contains("law of the solid spots"),
        "{svg}"
    );
}

#[test]
fn what_cannot_be_ranked_is_refused_with_the_way_on() {
    let folder = folder("joints/rig_coupon.toml");
    for (wrong, part) in [
        (&["--draws", "100"][..], "16384"),
        (&["--draws", "1e9"], "1000000"),
        (&["--draws", "many"], "1e5"),
        (&["--of", "weather"], "source_to_sink"),
    ] {
        let refused = within(&folder)
            .args(["drivers", "joint.toml"])
            .args(wrong)
            .assert()
            .code(2)
            .stdout_eq("");
        assert!(
            stderr(&refused).contains(part),
            "{wrong:?}: {}",
            stderr(&refused)
        );
    }
    let joint = fs::read_to_string(folder.path().join("joint.toml")).expect("a joint");
    let states_heat = |line: &&str| line.starts_with("heat ") || line.starts_with("require");
    let silent: Vec<&str> = joint.lines().filter(|line| !states_heat(line)).collect();
    let silent = silent.join("\n");
    assert!(silent.len() + 5 < joint.len(), "{joint}");
    fs::write(folder.path().join("joint.toml"), silent).expect("a file can be written");
    let refused = within(&folder)
        .args(["drivers", "--of", "rise"])
        .args(FEW)
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&refused).contains("heat"), "{}", stderr(&refused));
}

#[test]
fn the_estimate_tells_how_its_ends_settled() {
    let folder = folder("joints/rig_coupon.toml");
    let estimate = |more: &[&str]| {
        let command = within(&folder).args(["estimate", "joint.toml", "--field", "cone"]);
        stdout(&command.args(more).assert().code(0))
    };
    let told = estimate(&["--draws", "1e3"]);
    assert!(told.contains("of 1000 draws"), "{told}");
    assert!(
        told.contains("source to sink after ¼, ½, all draws: low "),
        "{told}"
    );
    let json: serde_json::Value =
        serde_json::from_str(&estimate(&["--draws", "1000", "--json", "--verify", "2"]))
            .expect("JSON");
    let sampling = &json["sampling"];
    assert_eq!(sampling["scrambles"], 16);
    assert_eq!(sampling["source_to_sink"][2]["draws"], 1000);
    assert!(
        sampling["standard_error"]["contact"][1]
            .as_f64()
            .expect("a number")
            > 0.0
    );
    // The cone solves every draw.
    assert!(json["verification"].is_null(), "{json}");
    // Too few draws tell no error.
    let few: serde_json::Value =
        serde_json::from_str(&estimate(&["--draws", "100", "--json"])).expect("JSON");
    assert!(few["sampling"].is_null());
}
