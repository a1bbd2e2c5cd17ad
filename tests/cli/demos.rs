//! The demos a new user starts from, and the hints of `list`.

use crate::{json, names, ringsum, stderr, stdout, within};
use std::fs;
use tempfile::tempdir;

#[test]
fn a_demo_is_written_with_its_tables_and_never_over_another() {
    let folder = tempdir().unwrap();
    let new = |rest: &[&str]| {
        let mut all = vec!["new", "mine.toml", "--from-demo", "bowed_base"];
        all.extend(rest);
        within(&folder).args(all).assert()
    };
    fs::write(folder.path().join("bowed_base_flatness.csv"), "kept").unwrap();
    // The table is in the way: nothing is written.
    assert!(stderr(&new(&[]).code(2).stdout_eq("")).contains("--force"));
    assert_eq!(names(folder.path()), ["bowed_base_flatness.csv"]);
    let told = stderr(&new(&["--force"]).code(0).stdout_eq(""));
    assert!(told.contains("ringsum estimate mine.toml"), "{told}");
    assert_eq!(
        names(folder.path()),
        ["bowed_base_flatness.csv", "mine.toml"]
    );
    assert_eq!(
        fs::read_to_string(folder.path().join("bowed_base_flatness.csv")).unwrap(),
        fs::read_to_string("joints/bowed_base_flatness.csv").unwrap()
    );
    within(&folder)
        .args(["check", "mine.toml"])
        .assert()
        .code(0);
}

#[test]
fn an_unknown_demo_lists_them_all_and_one_with_tables_is_not_printed_alone() {
    let told = stderr(
        &ringsum()
            .args(["new", "--from-demo", "sensor_lit"])
            .assert()
            .code(2)
            .stdout_eq(""),
    );
    assert!(told.contains("did you mean `sensor_lid`?"), "{told}");
    for demo in ["converter_box", "uhv_absorber", "avionics_shim"] {
        assert!(told.contains(demo), "{told}");
    }
    let alone = ringsum()
        .args(["new", "--from-demo", "bowed_base"])
        .assert()
        .code(2)
        .stdout_eq("");
    assert!(stderr(&alone).contains("bowed_base_flatness.csv"));
}

#[test]
fn the_first_line_of_the_first_steps_gives_a_number() {
    let bare = stdout(&ringsum().assert().code(0));
    let first = bare.lines().next().unwrap();
    assert!(first.starts_with("ringsum new --from-demo sensor_lid | ringsum estimate - "));
    let joint = stdout(
        &ringsum()
            .args(["new", "--from-demo", "sensor_lid"])
            .assert()
            .code(0),
    );
    let told = stdout(
        &ringsum()
            .args(["estimate", "-"])
            .stdin(joint)
            .assert()
            .code(0),
    );
    assert!(told.contains("source to sink"), "{told}");
}

#[test]
fn words_filter_the_catalogue_and_a_slip_meets_its_neighbour() {
    let told = stdout(
        &ringsum()
            .args(["list", "materials", "steel"])
            .assert()
            .code(0),
    );
    assert!(!told.contains("Al 6061"), "{told}");
    let both = stdout(
        &ringsum()
            .args(["list", "materials", "al", "7075"])
            .assert()
            .code(0),
    );
    assert!(both.contains("7075") && !both.contains("6061"), "{both}");
    let object = json(
        &ringsum()
            .args(["list", "fillers", "indium", "--json"])
            .assert()
            .code(0),
    );
    let fillers = object["kinds"]["fillers"].as_array().unwrap();
    assert!(!fillers.is_empty());
    assert!(
        fillers
            .iter()
            .all(|each| each.to_string().to_lowercase().contains("indium"))
    );
    for (words, near) in [
        (&["matrials"][..], "did you mean the kind `materials`?"),
        (&["gases", "heliun"], "did you mean `helium`?"),
        (&["materials", "zzzzzzzzzz"], "kinds: "),
    ] {
        let slip = ringsum()
            .arg("list")
            .args(words)
            .assert()
            .code(2)
            .stdout_eq("");
        assert!(stderr(&slip).contains(near), "{}", stderr(&slip));
    }
}

#[test]
fn a_grade_split_by_diameter_says_which_row_holds_where() {
    let told = stdout(&ringsum().args(["list", "grades", "8.8"]).assert().code(0));
    let rows: Vec<Vec<&str>> = told
        .lines()
        .filter(|line| line.starts_with("8.8 "))
        .map(|line| line.split("  ").filter(|cell| !cell.is_empty()).collect())
        .collect();
    // ISO 898-1: 800 MPa up to 16 mm, 830 MPa above.
    let cells = rows.iter().map(|row| [row[2].trim(), row[3].trim()]);
    assert_eq!(
        cells.collect::<Vec<_>>(),
        [["1.5–16", "800"], [">16–39", "830"]],
        "{told}"
    );
}

#[test]
fn pages_and_completions_know_every_flag_of_every_command() {
    let help = stdout(&ringsum().arg("--help").assert().code(0));
    let commands: Vec<&str> = help
        .lines()
        .skip_while(|line| !line.starts_with("Commands:"))
        .skip(1)
        .take_while(|line| !line.trim().is_empty())
        .filter_map(|line| line.strip_prefix("  ")?.split(' ').next())
        .filter(|word| !word.is_empty())
        .filter(|word| word.chars().all(|letter| letter.is_ascii_lowercase()))
        .collect();
    assert!(
        commands.contains(&"estimate") && commands.contains(&"new"),
        "{commands:?}"
    );
    let shells: Vec<String> = ["bash", "zsh", "fish"]
        .iter()
        .map(|shell| stdout(&ringsum().args(["completions", shell]).assert().code(0)))
        .collect();
    for command in commands {
        let told = stdout(&ringsum().args([command, "--help"]).assert().code(0));
        let page = stdout(&ringsum().args(["man", command]).assert().code(0)).replace("\\-", "-");
        let flags = told
            .split_whitespace()
            .filter(|word| word.starts_with("--") && word.len() > 4);
        for flag in
            flags.map(|word| word.trim_matches(|c: char| !c.is_ascii_alphanumeric() && c != '-'))
        {
            let flag = flag.split('=').next().unwrap_or(flag);
            assert!(page.contains(flag), "{command}: {flag}");
            for shell in &shells {
                assert!(
                    shell.contains(flag.trim_start_matches("--")),
                    "{command}: {flag}"
                );
            }
        }
    }
}
