//! Any text as a joint file with its variants and overrides.
#![no_main]

#[path = "../feeds.rs"]
#[allow(dead_code, reason = "one target feeds one reader")]
mod feeds;

libfuzzer_sys::fuzz_target!(|text: &str| feeds::joint_file(text));
