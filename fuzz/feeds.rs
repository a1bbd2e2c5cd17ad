//! What is fed to each reader: by the fuzz targets made-up inputs, by the tests the cases kept.

use ringsum::{
    diagnostic::Colour,
    fit,
    joint::{self, Outline},
    units,
};
use std::sync::LazyLock;

const BOWED: &str = include_str!("../joints/bowed_base.toml");
const MAP: &str = include_str!("../joints/bowed_base_flatness.csv");

/// A joint file with its variants; lines after a line `---` are overrides.
pub fn joint_file(text: &str) {
    let (text, sets) = text.split_once("\n---\n").unwrap_or((text, ""));
    let sets: Vec<String> = sets.lines().take(4).map(str::to_owned).collect();
    if let Err(faults) = joint::read_versions(text, &sets, &|_| Ok(MAP.to_owned())) {
        drop(faults.shown("joint.toml", Colour::Plain));
    }
}

/// The flatness map of a plate.
pub fn flatness(text: &str) {
    static OUTLINE: LazyLock<Outline> = LazyLock::new(|| {
        let read = joint::read_with_files(BOWED, &[], &|_| Ok(MAP.to_owned()));
        read.expect("a shipped joint").plates[0].outline.clone()
    });
    drop(joint::read_flatness(text, Some(&OUTLINE)));
}

/// A table of readings for `fit`.
pub fn measurements(text: &str) {
    drop(fit::Readings::read(text));
}

/// A quantity, as each kind.
pub fn unit(text: &str) {
    for quantity in units::Quantity::ALL {
        drop(units::parse(text, quantity));
    }
    drop(units::parse_roughness(text));
}
