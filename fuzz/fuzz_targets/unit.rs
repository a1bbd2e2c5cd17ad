//! Any text as a quantity of every kind.
#![no_main]

#[path = "../feeds.rs"]
#[allow(dead_code, reason = "one target feeds one reader")]
mod feeds;

libfuzzer_sys::fuzz_target!(|text: &str| feeds::unit(text));
