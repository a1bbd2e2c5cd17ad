//! Evidence: checks against values from elsewhere, noted as they are made, kept for the drawing of all.
//!
//! With `EVIDENCE=overwrite` a part of the evidence is written, else it is held against what is kept.

#![allow(dead_code, reason = "each test takes what it needs")]

use std::{cell::RefCell, fs, path::PathBuf};

use serde_json::{Value, json};

/// How far a mark may leave what is kept before the drawing is old: a tenth of what is accepted where
/// deviations are drawn over it, a hundredth of a ratio. Less is not seen in the drawing.
const OLD: [f64; 2] = [0.1, 0.01];

thread_local! {
    /// Deviation over what is accepted, and the relative deviation, of every check of this thread.
    static CHECKS: RefCell<Vec<[f64; 2]>> = const { RefCell::new(Vec::new()) };
}

/// Notes a check of a value found against a value expected within a relative tolerance.
pub fn note(found: f64, expected: f64, tolerance: f64) {
    let deviation = found / expected - 1.0;
    CHECKS.with_borrow_mut(|checks| checks.push([deviation / tolerance, deviation]));
}

/// All checks that a run makes, as one row: its name says where the expected values come from.
pub fn row(name: &str, run: impl FnOnce()) -> Value {
    CHECKS.with_borrow_mut(Vec::clear);
    run();
    let checks = CHECKS.with_borrow_mut(std::mem::take);
    assert!(!checks.is_empty(), "{name} notes no check");
    let largest = checks.iter().map(|[_, off]| off.abs()).fold(0.0, f64::max);
    let thousandth = |value: f64| (1e3 * value).round() / 1e3;
    let found: Vec<f64> = checks.iter().map(|[share, _]| thousandth(*share)).collect();
    let many = if found.len() == 1 { "" } else { "s" };
    json!({
        "name": name,
        "values": format!("{} value{many} within {:.2} %", found.len(), hundredth_above(100.0 * largest)),
        "accepted": [-1.0, 1.0],
        "band": null,
        "found": found,
    })
}

/// The hundredth at or above a value: what all are within. A last digit of rounding is no excess.
fn hundredth_above(value: f64) -> f64 {
    (100.0 * value - 1e-9).ceil() / 100.0
}

/// Keeps a part of the evidence, or holds it against what is kept.
pub fn keep(file: &str, part: &Value) {
    let path = PathBuf::from("figures/evidence").join(file);
    if std::env::var("EVIDENCE").is_ok_and(|word| word == "overwrite") {
        fs::write(&path, format!("{part:#}\n")).expect("the part can be written");
        return;
    }
    let kept = fs::read_to_string(&path).expect("the part is kept");
    let kept: Value = serde_json::from_str(&kept).expect("JSON");
    let rows = |part: &Value| part["rows"].as_array().cloned().unwrap_or_default();
    let (kept, found) = (rows(&kept), rows(part));
    let again = "EVIDENCE=overwrite writes it anew";
    assert_eq!(kept.len(), found.len(), "{file} is old; {again}");
    for (kept, found) in kept.iter().zip(&found) {
        assert_eq!(kept["name"], found["name"], "{file} is old; {again}");
        let values = |row: &Value| -> Vec<f64> {
            let found = row["found"].as_array().into_iter().flatten();
            found.filter_map(Value::as_f64).collect()
        };
        let (kept, found) = (values(kept), values(found));
        let [tenth, hundredth] = OLD;
        let near = |(one, other): (&f64, &f64)| {
            let allowed = if part["axis"] == "ratio" {
                hundredth * one.abs()
            } else {
                tenth
            };
            (one - other).abs() <= allowed
        };
        assert!(
            kept.len() == found.len() && kept.iter().zip(&found).all(near),
            "{file} is old: {kept:?} {found:?}; {again}"
        );
    }
}
