//! The modules form a one-way street; this test is its sign.

use std::{collections::BTreeMap, fs, path::Path};

/// The four modules that know no joint; every module below may use them.
const TOP: &[&str] = &["numerics", "units", "diagnostic", "catalog"];

/// Every module in the order in which force and heat flow.
const ORDER: &[&str] = &[
    "numerics",
    "units",
    "diagnostic",
    "catalog",
    "joint",
    "preload",
    "pressure",
    "conductance",
    "resistance",
    "estimate",
    "uncertainty",
    "fit",
    "layout",
    "report",
    "figures",
    "cli",
];

/// What a module may not use although it stands above it.
const NOT: &[(&str, &[&str])] = &[
    ("numerics", &["units", "diagnostic", "catalog"]),
    ("units", &["numerics", "diagnostic", "catalog"]),
    ("diagnostic", &["numerics", "catalog"]),
    ("preload", &["units"]),
    ("pressure", &["units", "preload"]),
    ("conductance", &["units", "preload", "pressure"]),
    ("resistance", &["units", "preload", "conductance"]),
];

#[test]
fn modules_name_only_modules_upstream_of_them() {
    let mut offences = Vec::new();
    for (module, text) in modules() {
        let Some(place) = ORDER.iter().position(|name| *name == module) else {
            offences.push(format!("{module} is missing from the module map"));
            continue;
        };
        let barred = NOT
            .iter()
            .find(|(name, _)| *name == module)
            .map_or(&[][..], |(_, barred)| barred);
        for (other_place, other) in ORDER.iter().enumerate() {
            let upstream =
                other_place < place || TOP.contains(&module.as_str()) && TOP.contains(other);
            if *other != module && (!upstream || barred.contains(other)) && mentions(&text, other) {
                offences.push(format!("{module} must not use {other}"));
            }
        }
    }
    assert!(offences.is_empty(), "{offences:#?}");
}

#[test]
fn physics_does_not_read_print_or_draw_random_numbers() {
    const FORBIDDEN: &[&str] = &[
        "std::fs",
        "std::io",
        "std::env",
        "println!",
        "eprintln!",
        "rand::",
        "Sobol",
        "toml::",
    ];
    const PHYSICS: &[&str] = &[
        "preload",
        "pressure",
        "conductance",
        "resistance",
        "estimate",
    ];
    for (module, text) in modules() {
        for word in FORBIDDEN {
            let offends = PHYSICS.contains(&module.as_str()) && before_tests(&text).contains(word);
            assert!(!offends, "{module} uses {word}");
        }
    }
}

#[test]
fn every_source_file_tells_its_purpose_first() {
    let mut silent = Vec::new();
    each_file(Path::new("src"), &mut |path, text| {
        if !text.starts_with("//! ") {
            silent.push(path.display().to_string());
        }
    });
    assert!(silent.is_empty(), "{silent:#?}");
}

#[test]
fn no_source_file_outgrows_its_idea() {
    let mut long = Vec::new();
    each_file(Path::new("src"), &mut |path, text| {
        if text.lines().count() > 600 {
            long.push(path.display().to_string());
        }
    });
    assert!(long.is_empty(), "{long:#?}");
}

/// The handbook is the documentation of the source: a public law that states an equation says where
/// it holds and where it comes from.
#[test]
fn every_public_law_tells_its_range_and_its_source() {
    const LAWS: &[&str] = &[
        "joint",
        "preload",
        "pressure",
        "conductance",
        "resistance",
        "uncertainty",
        "fit",
    ];
    let (mut laws, mut silent) = (0, Vec::new());
    each_file(Path::new("src"), &mut |path, text| {
        let room = path.iter().nth(1).map(Path::new).and_then(Path::file_stem);
        if !room.is_some_and(|room| LAWS.iter().any(|law| room == *law)) {
            return;
        }
        let mut told = String::new();
        for line in before_tests(text).lines().map(str::trim_start) {
            if let Some(words) = line.strip_prefix("///") {
                told.push_str(&words.to_lowercase());
                told.push('\n');
                continue;
            }
            if line.starts_with("#[") {
                continue;
            }
            let is_law = told.contains("```text")
                && (line.starts_with("pub fn ") || line.starts_with("pub const fn "));
            if is_law {
                laws += 1;
                for words in [&["valid", "exact"][..], &["source"]] {
                    if !words.iter().any(|word| told.contains(word)) {
                        silent.push(format!("{}: {line}: no {}", path.display(), words[0]));
                    }
                }
            }
            told.clear();
        }
    });
    assert!(laws > 60, "the search found {laws} laws");
    assert!(silent.is_empty(), "{silent:#?}");
}

/// The front page leads through every module.
#[test]
fn the_front_page_names_every_module() {
    let page = fs::read_to_string("src/lib.rs").expect("source is text");
    for module in ORDER {
        assert!(page.contains(&format!("[`{module}`]")), "{module}");
    }
}

/// Whether `text` holds the path `crate::other`, alone or in a braced group.
fn mentions(text: &str, other: &str) -> bool {
    text.match_indices("crate::").any(|(at, prefix)| {
        let rest = &text[at + prefix.len()..];
        let path = if rest.starts_with('{') {
            rest.split(';').next().unwrap_or(rest)
        } else {
            rest.split([';', ':', '(', '<', ' ', '\n'])
                .next()
                .unwrap_or(rest)
        };
        path.split(|c: char| !c.is_alphanumeric() && c != '_')
            .any(|word| word == other)
    })
}

/// The source text of every top-level module.
fn modules() -> BTreeMap<String, String> {
    let mut found = BTreeMap::new();
    each_file(Path::new("src"), &mut |path, text| {
        let relative = path.strip_prefix("src").expect("every file lies below src");
        let first = relative.iter().next().expect("a file has a name");
        let module = Path::new(first).file_stem().expect("a file has a stem");
        let module = module.to_string_lossy().into_owned();
        if module != "lib" && module != "main" {
            let gathered: &mut String = found.entry(module).or_default();
            gathered.push_str(text);
        }
    });
    found
}

/// The part of a source text above its unit tests.
fn before_tests(text: &str) -> &str {
    text.split("#[cfg(test)]").next().unwrap_or(text)
}

fn each_file(folder: &Path, visit: &mut impl FnMut(&Path, &str)) {
    let mut entries: Vec<_> = fs::read_dir(folder)
        .expect("the folder is there")
        .map(|entry| entry.expect("the entry is readable").path())
        .collect();
    entries.sort();
    for path in entries {
        if path.is_dir() {
            each_file(&path, visit);
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            visit(&path, &fs::read_to_string(&path).expect("source is text"));
        }
    }
}
