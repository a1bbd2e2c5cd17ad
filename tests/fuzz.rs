//! Cases that once broke a reader, or came near: none panics, none takes long.
//!
//! Each file of `tests/data/fuzz/TARGET` is fed as `.ci/fuzz TARGET` feeds it.

#[path = "../fuzz/feeds.rs"]
mod feeds;

use std::{
    fs,
    path::Path,
    time::{Duration, Instant},
};

/// The bar of the fuzz targets, 1 s, three times over: tests run beside each other.
const LONGEST: Duration = Duration::from_secs(3);

fn feed_all(target: &str, feed: fn(&str)) {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("tests/data/fuzz")
        .join(target);
    let mut fed = 0;
    for entry in fs::read_dir(&folder).expect("cases are kept") {
        let path = entry.expect("an entry").path();
        let bytes = fs::read(&path).expect("a case");
        // A target takes text alone, as the program does.
        let Ok(text) = String::from_utf8(bytes) else {
            continue;
        };
        let began = Instant::now();
        feed(&text);
        let took = began.elapsed();
        assert!(took < LONGEST, "{} took {took:?}", path.display());
        fed += 1;
    }
    assert!(fed > 0, "no case in {}", folder.display());
}

#[test]
fn joint_files_kept_from_fuzzing_are_read_or_refused() {
    feed_all("joint_file", feeds::joint_file);
}

#[test]
fn flatness_maps_kept_from_fuzzing_are_read_or_refused() {
    feed_all("flatness", feeds::flatness);
}

#[test]
fn readings_kept_from_fuzzing_are_read_or_refused() {
    feed_all("measurements", feeds::measurements);
}

#[test]
fn quantities_kept_from_fuzzing_are_read_or_refused() {
    feed_all("unit", feeds::unit);
}
