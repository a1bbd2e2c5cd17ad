//! Sandwich panels and flanges of inserts: values, assumptions, what is refused.

use ringsum::joint::{Engagement, Joint};

use crate::{codes, near, plain, read};

/// The plain joint on a panel of 15 mm, with other lines in the panel and in the fastener.
fn text(panel: &str, fastener: &str) -> String {
    let text = plain();
    let at = text.rfind("thickness").expect("the second plate has one");
    let line = text[at..].find('\n').expect("a line") + at;
    let text = format!(
        "{}thickness = \"15 mm\"\n{panel}{}",
        &text[..at],
        &text[line..]
    );
    let at = text.rfind("torque").expect("the fastener has one");
    format!("{}{fastener}\n{}", &text[..at], &text[at..])
}

const SANDWICH: &str =
    "sandwich = { face_sheet = \"0.5 mm\", core_conductivity = \"1.2 W/(m·K)\" }";
const INSERT: &str = "engagement = { kind = \"insert\", length = \"9 mm\", flange = \"14 mm\" }";

fn assumed(joint: &Joint, field: &str) -> bool {
    let fields = joint.assumptions.iter().map(|each| each.field.as_str());
    fields.filter(|known| known.ends_with(field)).count() == 1
}

#[test]
fn a_sandwich_is_read_with_its_assumptions() {
    let joint = read(&text(SANDWICH, INSERT));
    let panel = joint.cold();
    let sandwich = panel.sandwich.as_ref().expect("a sandwich");
    assert!(near(sandwich.face_sheet, 5e-4) && near(sandwich.core_conductivity, 1.2));
    assert!(near(sandwich.core_modulus, 5e8));
    assert_eq!(sandwich.insert.name, "Al 6061-T6");
    for field in ["core_modulus", "sandwich.insert", "sandwich.core", "proud"] {
        assert!(assumed(&joint, field), "{field}: {:?}", joint.assumptions);
    }
    let fastener = &joint.fasteners[0];
    let flange = fastener.flange.expect("a flange");
    assert!(near(flange.radius, 7e-3) && flange.proud == 0.0);
    assert!(matches!(fastener.engagement, Engagement::Insert { length } if near(length, 9e-3)));
    assert!(joint.is_flush());
    let stated = SANDWICH.replace(" }", ", core_modulus = \"0.7 GPa\", insert = \"304\" }");
    let proud = INSERT.replace(" }", ", proud = \"50 µm\" }");
    let joint = read(&text(&stated, &proud));
    let sandwich = joint.cold().sandwich.as_ref().expect("a sandwich");
    assert!(near(sandwich.core_modulus, 7e8) && sandwich.insert.name == "304");
    assert!(!joint.is_flush());
    for field in ["core_modulus", "sandwich.insert", "proud"] {
        assert!(!assumed(&joint, field), "{field}");
    }
}

#[test]
fn a_flange_may_stand_on_a_solid_plate() {
    let proud = INSERT.replace(" }", ", proud = \"50 µm\" }");
    let joint = read(&text("", &proud));
    assert!(joint.cold().sandwich.is_none() && !joint.is_flush());
    assert!(
        read(&text("", "engagement = \"insert\"")).fasteners[0]
            .flange
            .is_none()
    );
}

#[test]
fn a_sandwich_needs_flanges_and_plain_faces() {
    let short = "engagement = { kind = \"insert\", length = \"9 mm\" }";
    assert_eq!(codes(&text(SANDWICH, short)), ["file/missing-key"]);
    let proud = "engagement = { kind = \"insert\", length = \"9 mm\", proud = \"0.1 mm\" }";
    assert_eq!(codes(&text("", proud)), ["file/missing-key"]);
    let below = INSERT.replace(" }", ", proud = \"-0.1 mm\" }");
    assert_eq!(codes(&text(SANDWICH, &below)), ["value/range"]);
    for part in [
        "sag = { flux = \"20 kW/m²\" }",
        "feet = { height = \"3 mm\", at = [{ centre = [\"10 mm\", \"10 mm\"], diameter = \"16 mm\" }] }",
    ] {
        let panel = format!("{SANDWICH}\n{part}");
        assert_eq!(codes(&text(&panel, INSERT)), ["plate/sandwich"], "{part}");
    }
    // A nut would crush the core; without a conductivity the core is none.
    assert_eq!(codes(&text(SANDWICH, "")), ["plate/sandwich"]);
    let bare = "sandwich = { face_sheet = \"0.5 mm\" }";
    assert_eq!(codes(&text(bare, INSERT)), ["file/missing-key"]);
}

#[test]
fn a_sandwich_lies_outside_and_takes_no_heads() {
    let first = plain().replacen("thickness", &format!("{SANDWICH}\nthickness"), 1);
    assert_eq!(codes(&first), ["plate/sandwich"]);
    let stack = text(SANDWICH, INSERT);
    let second = stack.rfind("[[plate]]").expect("two plates");
    let shim = format!(
        "[[plate]]\nname = \"shim\"\nmaterial = \"304\"\nthickness = \"3 mm\"\n{SANDWICH}\n\
         size = [\"80 mm\", \"60 mm\"]\nfinish = \"milled\"\n"
    );
    let stack = format!("{}{shim}{}", &stack[..second], &stack[second..]);
    assert_eq!(codes(&stack), ["plate/sandwich"]);
}
