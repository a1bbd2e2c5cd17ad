//! Good joint files and what they become.

use std::{fs, path::PathBuf};

use ringsum::{
    diagnostic::Colour,
    joint::{self, Joint},
};

fn reference(name: &str) -> String {
    let path = PathBuf::from(env!("CARGO_MANIFEST_DIR"))
        .join("tests/data/joints")
        .join(name);
    fs::read_to_string(path).unwrap()
}

fn read(text: &str) -> Joint {
    match joint::read_with(text, &[]) {
        Ok(joint) => joint,
        Err(faults) => panic!("{}", faults.shown("joint.toml", Colour::Plain)),
    }
}

#[test]
fn reference_joints_are_accepted_as_they_stand() {
    for name in [
        "case_i.toml",
        "case_ii_flat.toml",
        "case_ii_concave30.toml",
        "round_single.toml",
    ] {
        println!("{name}: {:#?}", read(&reference(name)).assumptions);
    }
}
