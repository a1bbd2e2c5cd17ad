//! Any text as the flatness map of a plate.
#![no_main]

#[path = "../feeds.rs"]
#[allow(dead_code, reason = "one target feeds one reader")]
mod feeds;

libfuzzer_sys::fuzz_target!(|text: &str| feeds::flatness(text));
