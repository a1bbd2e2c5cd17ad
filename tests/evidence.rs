//! The drawing of the evidence holds what the tests have kept of their checks, misses included.

use std::{fs, path::Path};

use ringsum::figures::{self, Drawing, EvidenceAxis, EvidencePanel, EvidencePlot, EvidenceRow};
use serde_json::Value;

/// Parts of the evidence in the order of the drawing.
const PARTS: [&str; 6] = [
    "measured.json",
    "preload.json",
    "round.json",
    "columns_fine.json",
    "columns_fast.json",
    "conductance.json",
];

fn panel(part: &Value) -> EvidencePanel {
    let numbers = |value: &Value| -> Vec<f64> {
        let all = value.as_array().into_iter().flatten();
        all.filter_map(Value::as_f64).collect()
    };
    let pair = |value: &Value| {
        let ends = numbers(value);
        (ends.len() == 2).then(|| [ends[0], ends[1]])
    };
    let text = |value: &Value| value.as_str().expect("a text").to_owned();
    EvidencePanel {
        axis: match part["axis"].as_str() {
            Some("ratio") => EvidenceAxis::Ratio,
            Some("tolerance") => EvidenceAxis::Tolerance,
            other => panic!("{other:?} is no axis"),
        },
        name: text(&part["name"]),
        rows: part["rows"]
            .as_array()
            .expect("rows")
            .iter()
            .map(|row| EvidenceRow {
                name: text(&row["name"]),
                values: text(&row["values"]),
                accepted: pair(&row["accepted"]).expect("two ends"),
                band: pair(&row["band"]),
                found: numbers(&row["found"]),
            })
            .collect(),
    }
}

#[test]
fn the_drawing_holds_what_the_tests_keep() {
    let parts = PARTS.map(|file| {
        let text = fs::read_to_string(Path::new("figures/evidence").join(file));
        let text = text.unwrap_or_else(|found| panic!("{file}: {found}"));
        serde_json::from_str::<Value>(&text).expect("JSON")
    });
    let mut panels: Vec<EvidencePanel> = Vec::new();
    for part in &parts {
        let part = panel(part);
        // Neighbours against the same source share a panel.
        match panels.last_mut().filter(|last| last.name == part.name) {
            Some(last) => last.rows.extend(part.rows),
            None => panels.push(part),
        }
    }
    let checks: usize = panels
        .iter()
        .flat_map(|panel| &panel.rows)
        .map(|row| row.found.len())
        .sum();
    let plot = EvidencePlot {
        title: "Evidence: found against expected, by source".to_owned(),
        told: format!("{checks} checks of the test suite, misses included"),
        panels,
    };
    let svg = figures::svg(&Drawing::Evidence(Box::new(plot))).expect("a drawing");
    let path = "figures/evidence.svg";
    if std::env::var("EVIDENCE").is_ok_and(|word| word == "overwrite") {
        fs::write(path, &svg).expect("the drawing can be written");
    }
    let kept = fs::read_to_string(path).expect("the drawing is kept");
    assert!(
        kept == svg,
        "{path} is old; EVIDENCE=overwrite draws it anew"
    );
}
