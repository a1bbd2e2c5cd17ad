//! Data files of the tests in TOML, and their numbers.

#![allow(dead_code, reason = "each test takes what it needs")]

use std::fs;

/// A data file beside the tests.
pub fn data(name: &str) -> toml::Table {
    let path = format!("{}/tests/data/{name}", env!("CARGO_MANIFEST_DIR"));
    fs::read_to_string(path)
        .expect("the data file is beside the tests")
        .parse()
        .expect("the data file is TOML")
}

/// The number under a key, whole or not.
pub fn number(row: &toml::Value, key: &str) -> f64 {
    float(&row[key])
}

/// The numbers of the list under a key.
pub fn numbers(row: &toml::Value, key: &str) -> Vec<f64> {
    row[key]
        .as_array()
        .expect("a list")
        .iter()
        .map(float)
        .collect()
}

/// A number, whole or not.
pub fn float(value: &toml::Value) -> f64 {
    value
        .as_float()
        .unwrap_or_else(|| value.as_integer().expect("a number") as f64)
}
