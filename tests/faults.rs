//! Broken joint files, one for each fault code, and what is said about them.
//!
//! `SNAPSHOTS=overwrite cargo test --test faults` writes the expected texts anew; read the
//! difference before committing it.

use std::{collections::BTreeSet, fs, path::PathBuf};

use ringsum::{
    diagnostic::Colour,
    joint::{self, Faults},
};

fn folder(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join(name)
}

fn text_of(path: &PathBuf) -> String {
    fs::read_to_string(path).expect("the file exists and is UTF-8")
}

/// The broken files: name without ending, and text.
fn broken() -> Vec<(String, String)> {
    let entries = fs::read_dir(folder("tests/faults")).expect("the folder exists");
    let mut files: Vec<(String, String)> = entries
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .map(|path| {
            let name = path.file_stem().expect("a name").to_string_lossy();
            (name.into_owned(), text_of(&path))
        })
        .collect();
    files.sort();
    files
}

/// Overrides stand in comments: `# --set path=value`.
fn sets(text: &str) -> Vec<String> {
    let lines = text.lines();
    lines
        .filter_map(|line| line.strip_prefix("# --set "))
        .map(str::to_owned)
        .collect()
}

/// Tables stand beside the broken files.
fn table(name: &str) -> Result<String, String> {
    fs::read_to_string(folder("tests/faults").join(name))
        .map_err(|_| "there is no such file".into())
}

fn faults(name: &str, text: &str) -> Faults {
    joint::read_versions(text, &sets(text), &table)
        .expect_err(&format!("{name}.toml must be refused"))
}

#[test]
fn every_broken_file_is_told_what_is_wrong() {
    let overwrite = std::env::var("SNAPSHOTS").is_ok_and(|value| value == "overwrite");
    for (name, text) in broken() {
        let told = faults(&name, &text).shown("joint.toml", Colour::Plain) + "\n";
        let path = folder("tests/faults").join(format!("{name}.txt"));
        if overwrite {
            fs::write(&path, &told).expect("the folder can be written");
        }
        assert_eq!(told, text_of(&path), "{name}.toml");
    }
}

/// Fault codes that the source of the reader can tell: text such as `plate/hole-outside`.
fn codes_in_source() -> BTreeSet<String> {
    let mut codes = BTreeSet::new();
    let mut folders = vec![folder("src/joint")];
    let mut texts = vec![text_of(&folder("src/joint.rs"))];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(folder).expect("the folder exists") {
            let path = entry.expect("an entry").path();
            if path.is_dir() {
                folders.push(path);
            } else {
                texts.push(text_of(&path));
            }
        }
    }
    for text in &texts {
        for quoted in text.split('"') {
            let is_word = |word: &str| {
                word.len() > 2 && word.chars().all(|c| c.is_ascii_lowercase() || c == '-')
            };
            if quoted
                .split_once('/')
                .is_some_and(|(room, rest)| is_word(room) && is_word(rest))
            {
                codes.insert(quoted.to_owned());
            }
        }
    }
    codes
}

#[test]
fn every_code_has_a_broken_file() {
    let mut shown = BTreeSet::from([
        // A file of more than a megabyte is not kept; `a_huge_file_is_refused` tells this one.
        "file/too-large".to_owned(),
    ]);
    for (name, text) in broken() {
        for (_, fault) in faults(&name, &text).faults {
            shown.insert(fault.code.to_owned());
        }
    }
    // `unit/…` codes come from the units and are shown as well.
    let source = codes_in_source();
    let missing: Vec<_> = source.difference(&shown).collect();
    assert!(missing.is_empty(), "no broken file for {missing:?}");
    assert!(source.len() > 30, "the search found {} codes", source.len());
}

#[test]
fn a_broken_file_is_named_after_its_code() {
    for (name, text) in broken() {
        if name == "all-at-once" || name == "set-value" {
            continue;
        }
        let told = faults(&name, &text);
        let named = |code: &str| name.starts_with(&code.replace('/', "-"));
        assert!(
            told.faults.iter().any(|(_, fault)| named(fault.code)),
            "{name}"
        );
    }
}

#[test]
fn faults_stand_in_file_order_with_labels() {
    for (name, text) in broken() {
        let told = faults(&name, &text);
        let starts: Vec<_> = told
            .faults
            .iter()
            .map(|(source, fault)| (*source, fault.span.start))
            .collect();
        assert!(starts.is_sorted(), "{name}: {starts:?}");
        for (_, fault) in &told.faults {
            assert!(!fault.expected.is_empty(), "{name}: {}", fault.message);
        }
    }
}

#[test]
fn all_faults_are_told_at_once() {
    let (_, text) = broken()
        .into_iter()
        .find(|(name, _)| name == "all-at-once")
        .expect("the file is kept");
    let codes: Vec<_> = joint::read(&text)
        .expect_err("six things are wrong")
        .into_iter()
        .map(|fault| fault.code)
        .collect();
    assert_eq!(
        codes,
        [
            "name/unknown",
            "unit/not-a-quantity",
            "name/unknown",
            "name/unknown",
            "file/unknown-key",
            "plate/hole-outside",
        ]
    );
}

#[test]
fn a_slip_of_a_key_is_told_once_and_its_value_is_read() {
    let (_, good) = broken()
        .into_iter()
        .find(|(name, _)| name == "file-unknown-key")
        .expect("the file is kept");
    let codes = |text: &str| -> Vec<&str> {
        let faults = joint::read(text).expect_err("the key is unknown");
        faults.iter().map(|fault| fault.code).collect()
    };
    assert_eq!(codes(&good), ["file/unknown-key"]);
    let worse = good.replace("torqe = \"2 N·m\"", "torqe = \"2 N\"");
    assert_eq!(codes(&worse), ["file/unknown-key", "unit/not-a-quantity"]);
    // A whole table under a mistyped name is read as well.
    let table = good.replace("[fastener]", "[fasteners]");
    assert_eq!(codes(&table), ["file/unknown-key", "file/unknown-key"]);
}

#[test]
fn faults_behind_a_slip_of_syntax_are_told_too() {
    let (_, text) = broken()
        .into_iter()
        .find(|(name, _)| name == "file-syntax")
        .expect("the file is kept");
    let text = text.replace("\"70 mm\", \"50 mm\"", "\"90 mm\", \"50 mm\"");
    let faults = joint::read(&text).expect_err("quotes are missing");
    let codes: Vec<_> = faults.iter().map(|fault| fault.code).collect();
    assert_eq!(codes, ["file/syntax", "plate/hole-outside"]);
}

#[test]
fn bolts_are_checked_even_without_plates() {
    let (_, text) = broken()
        .into_iter()
        .find(|(name, _)| name == "plate-count")
        .expect("the file is kept");
    let start = text.find("[[plate]]").expect("plates are stated");
    let end = text.find("[fastener]").expect("a fastener is stated");
    let text = format!("{}{}", &text[..start], &text[end..]).replace("8.8", "8.7");
    let faults = joint::read(&text).expect_err("plates are missing");
    let codes: Vec<_> = faults.iter().map(|fault| fault.code).collect();
    assert_eq!(codes, ["file/missing-key", "name/unknown"]);
}

#[test]
fn part_of_a_name_lists_those_that_hold_it() {
    let (_, text) = broken()
        .into_iter()
        .find(|(name, _)| name == "name-unknown")
        .expect("the file is kept");
    let faults = joint::read(&text.replace("Al 6061-T7", "brass")).expect_err("several are known");
    let help = faults[0].help.as_deref().unwrap_or_default();
    assert!(help.to_lowercase().contains("brass"), "{help}");
}

#[test]
fn a_roughness_without_its_parameter_is_not_a_process() {
    let (_, text) = broken()
        .into_iter()
        .find(|(name, _)| name == "name-unknown")
        .expect("the file is kept");
    let text = text
        .replace("Al 6061-T7", "Al 6061-T6")
        .replacen("milled", "32 µin", 1);
    let faults = joint::read(&text).expect_err("Ra or Rq is missing");
    assert_eq!(faults[0].code, "unit/not-a-quantity");
}

#[test]
fn a_huge_file_is_refused_with_the_limit_named() {
    let text = "# ".repeat(joint::LONGEST_FILE / 2 + 1);
    let faults = joint::read(&text).expect_err("it is too large");
    assert_eq!(faults[0].code, "file/too-large");
    assert!(faults[0].expected.contains(" 1000000 "), "{faults:?}");
}
