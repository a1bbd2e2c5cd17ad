//! Load along the bolts, disc springs and the hold of inserts: values, assumptions, what is refused.

use crate::{codes, near, plain, read};

/// The plain joint with other lines in its fastener.
fn text(fastener: &str) -> String {
    let text = plain();
    let at = text.rfind("torque").expect("the fastener has one");
    format!("{}{fastener}\n{}", &text[..at], &text[at..])
}

const SPRINGS: &str = "outer = \"10 mm\", inner = \"5.2 mm\", thickness = \"0.5 mm\"";

#[test]
fn a_load_is_read_with_what_is_assumed_of_it() {
    let joint = read(&text("axial_load = [\"200 N\", \"500 N\"]"));
    let load = joint.fasteners[0].axial_load.expect("a load");
    let any = load.any.expect("for any case");
    assert!(near(any.low, 200.0) && near(any.high, 500.0));
    assert!(near(load.introduction.low, 0.0) && near(load.introduction.high, 1.0));
    assert!(near(load.safety, 1.2) && load.lasting);
    for field in ["introduction", "safety", "lasting"] {
        let told = |each: &str| each.ends_with(&format!("axial_load.{field}"));
        assert!(
            joint.assumptions.iter().any(|each| told(&each.field)),
            "{field}"
        );
    }
    assert!(near(load.in_case("cold").nominal, any.nominal));
}

// The head of the plain joint and its mean radius of friction are those of the catalogue.
#[test]
fn a_wider_bearing_does_not_move_where_the_head_turns() {
    let radius = |bearing: &str| {
        let joint = read(&text(&format!("hole = \"4.5 mm\"\n{bearing}")));
        let assumed = joint.assumptions.iter();
        let told = assumed.filter(|each| each.value.starts_with("friction of the head"));
        (joint.fasteners[0].friction_radius, told.count())
    };
    let (own, untold) = radius("");
    let (wide, told) = radius("bearing = \"18 mm\"");
    // On the hole of 4.5 mm by itself, on the 4 mm of the thread where something wider lies between.
    assert!((own - wide) < 0.13e-3 && own >= wide, "{own} {wide}");
    assert_eq!((untold, told), (0, 1));
    let (narrow, told) = radius("bearing = \"6 mm\"");
    assert!(near(narrow, 0.25 * (4.5e-3 + 6e-3)));
    assert_eq!(told, 0);
}

#[test]
fn a_load_of_a_case_needs_the_case() {
    assert_eq!(
        codes(&text("axial_load = { cold = \"500 N\" }")),
        ["file/conflict"]
    );
    assert_eq!(
        codes(&text("axial_load = { lasting = false }")),
        ["file/missing-key"]
    );
    assert_eq!(codes(&text("axial_load = \"-5 N\"")), ["value/range"]);
}

#[test]
fn disc_springs_are_read_one_by_default() {
    let joint = read(&text(&format!(
        "disc_springs = {{ {SPRINGS}, cone_height = \"0.25 mm\" }}"
    )));
    let springs = joint.fasteners[0].disc_springs.expect("springs");
    assert_eq!((springs.parallel, springs.series), (1, 1));
    assert!(near(springs.youngs_modulus, 206e9) && near(springs.cone_height, 0.25e-3));
}

#[test]
fn discs_that_are_none_are_refused() {
    let with = |line: &str| codes(&text(&format!("disc_springs = {{ {line} }}")));
    assert_eq!(
        with(&format!("{SPRINGS}, cone_height = \"0.8 mm\"")),
        ["value/range"]
    );
    let inside_out = SPRINGS.replace("5.2 mm", "11 mm");
    assert_eq!(
        with(&format!("{inside_out}, cone_height = \"0.2 mm\"")),
        ["value/min-above-max"]
    );
    assert_eq!(with(SPRINGS), ["file/missing-key"]);
    let two = format!("{SPRINGS}, cone_height = \"0.2 mm\", series = [2, 2]");
    assert_eq!(with(&two), ["value/range"]);
}

#[test]
fn the_hold_of_an_insert_belongs_to_an_insert() {
    let with = |kind: &str, hold: &str| {
        text(&format!(
            "engagement = {{ kind = \"{kind}\", length = \"4 mm\", {hold} }}"
        ))
    };
    let joint = read(&with("insert", "pull_out = \"3 kN\", outer = \"6 mm\""));
    let hold = joint.fasteners[0].insert_hold;
    assert_eq!(hold.pull_out.map(|force| near(force, 3000.0)), Some(true));
    assert_eq!(
        hold.outer_diameter.map(|outer| near(outer, 6e-3)),
        Some(true)
    );
    assert_eq!(
        codes(&with("tapped", "pull_out = \"3 kN\"")),
        ["file/conflict"]
    );
}
