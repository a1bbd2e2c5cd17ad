//! Joint files read as the tests need them, and their chains.

#![allow(dead_code, reason = "each test takes what it needs")]

use ringsum::{
    estimate::{Chain, Choice, Fineness, Watch},
    joint::{self, Joint},
};

/// More than any of these joints takes, bytes.
const MEMORY: u64 = 4_000_000_000;

/// A good joint.
pub fn read(text: &str) -> Joint {
    read_with(text, &[])
}

/// A good joint with fields set as by `--set`.
pub fn read_with(text: &str, sets: &[&str]) -> Joint {
    let sets: Vec<String> = sets.iter().map(|set| (*set).to_owned()).collect();
    joint::read_with(text, &sets).unwrap_or_else(|faults| panic!("{faults:#?}"))
}

/// The chain of a joint on the elastic field at `fast`.
pub fn fast(joint: &Joint) -> Chain<'_> {
    let choice = Choice::elastic(Fineness::Fast, MEMORY);
    Chain::of(joint, choice, &Watch::none()).expect("a field")
}

/// Four M4 of 60 mm by 60 mm plates of 5 and 8 mm in vacuum; `service`, `cooled` and `fastener` are lines
/// that stand in their tables.
pub fn four_m4(service: &str, cooled: &str, fastener: &str) -> String {
    format!(
        r#"
title = "Four M4"
[service]
medium = "vacuum"
{service}
[[plate]]
material = "Al 6061-T6"
thickness = "5 mm"
size = ["60 mm", "60 mm"]
finish = "milled"
[[plate]]
material = "Al 6061-T6"
thickness = "8 mm"
size = ["60 mm", "60 mm"]
finish = "milled"
{cooled}
[fastener]
thread = "M4"
grade = "A2-70"
head = "socket"
torque = "1.7 N·m"
{fastener}
pattern = {{ kind = "grid", count = [2, 2], margin = "10 mm" }}
"#
    )
}
