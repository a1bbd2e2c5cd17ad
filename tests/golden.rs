//! Every demo joint, its printed digits. Says *unchanged*, never *right*.
//!
//! `SNAPSHOTS=overwrite cargo test --profile quick --test golden` writes the files anew; read the
//! difference before you commit it.

use std::{fs, path::Path};

use ringsum::{
    estimate::{Chain, Choice, Fineness, Options, Watch},
    joint, report, uncertainty,
};

/// Draws enough to show the band, few enough to be quick.
const OPTIONS: Options = Options {
    draws: 256,
    seed: 1,
};

#[test]
fn demo_joints_print_what_they_printed() {
    let mut changed = Vec::new();
    let mut seen = 0;
    let mut beyond_cone = 0;
    for entry in fs::read_dir("joints").expect("the demo joints are there") {
        let path = entry.expect("the entry is readable").path();
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let text = fs::read_to_string(&path).expect("a joint file is text");
        let table = |name: &str| {
            fs::read_to_string(Path::new("joints").join(name)).map_err(|fault| fault.to_string())
        };
        let joint = joint::read_with_files(&text, &[], &table)
            .unwrap_or_else(|faults| panic!("{path:?}: {faults:#?}"));
        // What the cone cannot carry has no number of the cone.
        if !joint.needs_elastic().is_empty() {
            beyond_cone += 1;
            continue;
        }
        seen += 1;
        let found = uncertainty::estimate(&joint, &OPTIONS).expect("a demo joint has a number");
        let printed = report::text::estimate(&found);
        let golden = Path::new("tests/golden")
            .join(path.file_stem().expect("a file has a stem"))
            .with_extension("txt");
        if std::env::var("SNAPSHOTS").is_ok_and(|value| value == "overwrite") {
            fs::create_dir_all("tests/golden").expect("the folder can be made");
            fs::write(&golden, &printed).expect("the golden file can be written");
        }
        if fs::read_to_string(&golden).ok().as_deref() != Some(printed.as_str()) {
            changed.push(golden);
        }
    }
    assert_eq!(
        (seen, beyond_cone),
        (12, 5),
        "twelve demo joints for the cone, five beyond it"
    );
    assert!(changed.is_empty(), "changed: {changed:#?}");
}

/// Demo joints on the solved field, with their draws.
const SOLVED: [(&str, u32); 5] = [
    ("converter_box", 256),
    ("bowed_base", 0),
    ("led_bar", 0),
    ("avionics_shim", 0),
    ("honeycomb_panel", 0),
];

#[test]
fn solved_demo_joints_print_what_they_printed() {
    let mut changed = Vec::new();
    for (name, draws) in SOLVED {
        let path = Path::new("joints").join(name).with_extension("toml");
        let text = fs::read_to_string(&path).expect("a joint file is text");
        let table = |name: &str| {
            fs::read_to_string(Path::new("joints").join(name)).map_err(|fault| fault.to_string())
        };
        let joint = joint::read_with_files(&text, &[], &table)
            .unwrap_or_else(|faults| panic!("{path:?}: {faults:#?}"));
        let choice = Choice::elastic(Fineness::Fast, 1_000_000_000);
        let chain = Chain::of(&joint, choice, &Watch::none()).expect("a demo joint is solved");
        let options = Options { draws, ..OPTIONS };
        let found = uncertainty::along(&chain, &options).expect("a demo joint has a number");
        let printed = report::text::estimate(&found);
        let golden = Path::new("tests/golden/elastic")
            .join(name)
            .with_extension("txt");
        if std::env::var("SNAPSHOTS").is_ok_and(|value| value == "overwrite") {
            fs::create_dir_all("tests/golden/elastic").expect("the folder can be made");
            fs::write(&golden, &printed).expect("the golden file can be written");
        }
        if fs::read_to_string(&golden).ok().as_deref() != Some(printed.as_str()) {
            changed.push(golden);
        }
    }
    assert!(changed.is_empty(), "changed: {changed:#?}");
}
