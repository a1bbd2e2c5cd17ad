//! Cautions and codes: each explained, each produced somewhere, each told once.

#[path = "cautions/elastic.rs"]
mod elastic;
#[path = "cautions/strength.rs"]
mod strength;

use std::{
    collections::BTreeSet,
    fmt::Write,
    fs,
    path::{Path, PathBuf},
};

use ringsum::{
    diagnostic::{
        Caution,
        registry::{Kind, entries},
    },
    estimate::Options,
    joint, uncertainty,
};

/// Texts of the program below a folder, the registry and the tests left out.
fn sources(folder: &Path, texts: &mut Vec<String>) {
    for entry in fs::read_dir(folder).expect("the folder exists") {
        let path: PathBuf = entry.expect("an entry").path();
        if path.ends_with("diagnostic/registry") || path.ends_with("diagnostic/registry.rs") {
            continue;
        }
        if path.is_dir() {
            sources(&path, texts);
        } else if path.extension().is_some_and(|ending| ending == "rs")
            && !path.ends_with("tests.rs")
        {
            let text = fs::read_to_string(&path).expect("source is text");
            let program = text.split("#[cfg(test)]").next().unwrap_or_default();
            texts.push(program.to_owned());
        }
    }
}

/// Literals such as `plate/hole-outside` outside the registry.
fn codes_in_source() -> BTreeSet<String> {
    let is_word = |word: &str| {
        word.len() > 2
            && word
                .chars()
                .all(|c| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-')
    };
    let mut texts = Vec::new();
    sources(Path::new("src"), &mut texts);
    texts
        .iter()
        .flat_map(|text| text.split('"'))
        .filter(|quoted| {
            quoted
                .split_once('/')
                .is_some_and(|(room, rest)| is_word(room) && is_word(rest))
        })
        .map(str::to_owned)
        .collect()
}

fn codes_in_registry() -> BTreeSet<String> {
    // Laws and topics are explained to whoever asks for them; no fault or caution carries their code.
    let told = entries()
        .iter()
        .filter(|entry| !matches!(entry.kind, Kind::Law | Kind::Topic));
    told.map(|entry| entry.code.to_owned()).collect()
}

#[test]
fn every_code_has_an_entry() {
    let source = codes_in_source();
    assert!(source.len() > 80, "the search found {} codes", source.len());
    let known: BTreeSet<_> = entries()
        .iter()
        .map(|entry| entry.code.to_owned())
        .collect();
    let missing: Vec<_> = source.difference(&known).cloned().collect();
    assert!(missing.is_empty(), "{missing:?}");
}

#[test]
fn every_entry_has_a_place_that_produces_it() {
    let idle: Vec<_> = codes_in_registry()
        .difference(&codes_in_source())
        .cloned()
        .collect();
    assert!(idle.is_empty(), "{idle:?}");
}

/// The cautions of two round plates, a group of bolts for each list of places.
fn cautions(cooled: &str, groups: &[&str]) -> Vec<Caution> {
    let mut text = format!(
        r#"
title = "Cautions"
[service]
medium = "air"
temperature = "20 °C"
heat = "10 W"
[[plate]]
name = "upper"
material = "Al 6061-T6"
thickness = "4 mm"
diameter = "80 mm"
finish = "milled"
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "6 mm"
diameter = "120 mm"
finish = "milled"
cooled = {cooled}
"#
    );
    for places in groups {
        let _ = write!(
            text,
            r#"
[[fastener]]
thread = "M4"
grade = "A2-70"
head = "socket"
torque = "1.7 N·m"
engagement = {{ kind = "tapped", length = "6 mm" }}
at = [{places}]
"#
        );
    }
    let joint = joint::read(&text).expect("a good joint");
    let options = Options { draws: 0, seed: 1 };
    let estimate = uncertainty::estimate(&joint, &options).expect("a number");
    estimate.cautions
}

const BACK: &str = r#"{ face = "isothermal" }"#;
const RIM: &str = r#"{ edge = "rim" }"#;
const LEFT: &str = r#"["-20 mm", "-20 mm"], ["-20 mm", "20 mm"]"#;
const RIGHT: &str = r#"["20 mm", "-20 mm"], ["20 mm", "20 mm"]"#;

#[test]
fn like_groups_are_cautioned_once() {
    let found = cautions(BACK, &[LEFT, RIGHT]);
    assert!(found.len() > 5, "{found:#?}");
    for (place, caution) in found.iter().enumerate() {
        assert!(!found[..place].contains(caution), "{caution:?}");
    }
}

#[test]
fn a_cooled_rim_is_cautioned_where_bolts_share_the_heat() {
    let told = |cooled: &str, groups: &[&str]| {
        let found = cautions(cooled, groups);
        found
            .iter()
            .any(|caution| caution.code == "resistance/edge-sink")
    };
    assert!(told(RIM, &[LEFT, RIGHT]));
    assert!(!told(BACK, &[LEFT, RIGHT]));
    assert!(!told(RIM, &[r#"["0 mm", "0 mm"]"#]));
}
