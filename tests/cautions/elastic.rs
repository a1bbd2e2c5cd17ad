//! Cautions of a solved field: each produced by a joint that deserves it and not by its neighbour.

use ringsum::{
    diagnostic::{
        Caution,
        registry::{Gravity, gravity},
    },
    estimate::{Chain, Choice, Fineness, Options, Watch},
    joint, uncertainty,
};

/// A small joint of one bolt: plates of 4 and 6 mm, 24 by 24 mm.
const PLAIN: &str = r#"
title = "One bolt"
[service]
medium = "vacuum"
temperature = "20 °C"
heat = "10 W"
[[plate]]
name = "upper"
material = "Al 6061-T6"
thickness = "4 mm"
size = ["24 mm", "24 mm"]
finish = { process = "milled" }
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "6 mm"
size = ["24 mm", "24 mm"]
finish = { process = "milled" }
cooled = { film = "500 W/(m²·K)" }
[fastener]
thread = "M4"
grade = "A2-70"
head = "socket"
bearing = "7 mm"
hole = "4.5 mm"
torque = "1.2 N·m"
engagement = { kind = "nut" }
at = [["12 mm", "12 mm"]]
"#;

const MEMORY: u64 = 1_000_000_000;

/// The cautions of a joint on an elastic field, coarse but for its name.
fn told(text: &str) -> Vec<Caution> {
    let joint = joint::read(text).unwrap_or_else(|faults| panic!("{faults:#?}"));
    let choice = Choice::elastic(Fineness::Fast, MEMORY);
    let chain = Chain::of(&joint, choice, &Watch::none()).expect("a field");
    let options = Options { draws: 0, seed: 1 };
    let estimate = uncertainty::along(&chain, &options).expect("a number");
    estimate.cautions
}

/// The text of a caution; none where it is not told.
fn of(cautions: &[Caution], code: &str) -> Option<String> {
    let mut all = cautions.iter();
    all.find(|caution| caution.code == code)
        .map(|caution| caution.text.clone())
}

/// The plain joint with something in place of something else.
fn with(old: &str, new: &str) -> String {
    assert!(PLAIN.contains(old), "{old}");
    PLAIN.replacen(old, new, 1)
}

/// What only the cone and the plan grid have to say.
const PLAN_AND_CONE: [&str; 6] = [
    "resistance/cell",
    "resistance/edge-sink",
    "resistance/small-source",
    "pressure/flatness-ignored",
    "pressure/tapped-cone",
    "pressure/filler-spreads",
];

/// Two bolts on discs, cooled at the rim, heated on less than three thicknesses.
const RIM: &str = r#"
[service]
medium = "vacuum"
temperature = "20 °C"
[[plate]]
name = "upper"
material = "Al 6061-T6"
thickness = "4 mm"
diameter = "36 mm"
finish = { process = "milled", flatness = "2 µm" }
heated = { centre = ["0 mm", "0 mm"], diameter = "8 mm" }
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "6 mm"
diameter = "40 mm"
finish = { process = "milled" }
cooled = { edge = "rim" }
[fastener]
thread = "M4"
grade = "A2-70"
head = "socket"
hole = "4.5 mm"
torque = "1.2 N·m"
engagement = { kind = "tapped", length = "6 mm" }
at = [["-10 mm", "0 mm"], ["10 mm", "0 mm"]]
[filler]
conductivity = "3 W/(m·K)"
thickness = "0.1 mm"
modulus = "1 GPa"
"#;

#[test]
fn a_solved_field_is_not_told_what_cone_and_plan_grid_leave_out() {
    let found = told(RIM);
    for code in PLAN_AND_CONE {
        assert_eq!(of(&found, code), None, "{code}");
    }
    // The cone has to tell them of the same joint, or the test would prove nothing.
    let joint = joint::read(RIM).expect("a good joint");
    let options = Options { draws: 0, seed: 1 };
    let cone = uncertainty::estimate(&joint, &options).expect("a number");
    for code in PLAN_AND_CONE {
        assert!(of(&cone.cautions, code).is_some(), "the cone needs {code}");
    }
}

#[test]
fn a_plain_joint_presses_within_its_limits() {
    let found = told(PLAIN);
    for code in [
        "pressure/flatness-stays-open",
        "pressure/contact-at-edge",
        "pressure/head-off-foot",
        "pressure/filler-rigid",
        "pressure/elastic-limits",
        "pressure/layer-squeezed",
        "resistance/grid-error",
    ] {
        assert_eq!(of(&found, code), None, "{code}");
    }
}

#[test]
fn faces_that_stay_open_are_told_with_their_gaps() {
    let code = "pressure/flatness-stays-open";
    let concave = with(
        r#"finish = { process = "milled" }"#,
        "finish = { process = \"milled\" }\nbow = { kind = \"convex\", height = \"200 µm\" }",
    );
    let text = of(&told(&concave), code).expect("the corners stand open");
    assert!(
        text.contains("keep a gap of") && text.contains("in these numbers"),
        "{text}"
    );
    let stated = with(
        r#"finish = { process = "milled" }"#,
        r#"finish = { process = "milled", flatness = "200 µm" }"#,
    );
    let text = of(&told(&stated), code).expect("one way or the other it stands open");
    assert!(text.contains("flat within 200 µm"), "{text}");
}

#[test]
fn bolts_near_an_edge_press_it() {
    let code = "pressure/contact-at-edge";
    let near = with(
        r#"at = [["12 mm", "12 mm"]]"#,
        r#"at = [["4 mm", "12 mm"]]"#,
    );
    let text = of(&told(&near), code).expect("the head ends 0.5 mm inside the edge");
    assert!(text.contains("at (0.0, "), "{text}");
    // A pad gives way at its edge.
    let soft = near + "[filler]\nname = \"gap pad\"\n";
    assert_eq!(of(&told(&soft), code), None);
}

#[test]
fn heads_beside_their_feet_are_told_gravely() {
    let code = "pressure/head-off-foot";
    let size = r#"size = ["24 mm", "24 mm"]"#;
    let feet = |places: &[&str], diameter: &str| {
        let each: Vec<String> = places
            .iter()
            .map(|x| format!("{{ centre = [\"{x}\", \"12 mm\"], diameter = \"{diameter}\" }}"))
            .collect();
        let all = each.join(", ");
        with(
            size,
            &format!("{size}\nfeet = {{ height = \"1 mm\", at = [{all}] }}"),
        )
    };
    // The seat reaches from 2.25 to 3.5 mm off the axis.
    assert_eq!(of(&told(&feet(&["12 mm"], "12 mm")), code), None);
    let beside = of(&told(&feet(&["5 mm", "19 mm"], "6 mm")), code).expect("feet begin at 4 mm");
    assert!(
        beside.contains("at 1 of these") && beside.contains("only 0 %"),
        "{beside}"
    );
    // A foot of 3 mm radius: (3² − 2.25²)/(3.5² − 2.25²) = 0.55; rings of a tenth of a millimetre
    // take half of a ring more or less.
    let partly = of(&told(&feet(&["12 mm"], "6 mm")), code).expect("the seat reaches beyond it");
    assert!(
        ["only 5", "only 6"].iter().any(|start| {
            // Between 50 and 69 %, two digits.
            partly.split(start).nth(1).is_some_and(|rest| {
                rest.chars().nth(1) == Some(' ') && rest.starts_with(|c: char| c.is_ascii_digit())
            })
        }),
        "{partly}"
    );
    assert_eq!(gravity(code), Gravity::Grave);
}

#[test]
fn a_layer_is_told_when_its_softness_is_unknown_or_too_much() {
    let (rigid, squeezed) = ("pressure/filler-rigid", "pressure/layer-squeezed");
    let filled = |lines: &str| told(&format!("{PLAIN}[filler]\n{lines}\n"));
    let indium = filled("name = \"indium foil\"");
    assert!(of(&indium, rigid).is_some() && of(&indium, squeezed).is_none());
    let stiff = filled("conductivity = \"3 W/(m·K)\"\nthickness = \"0.5 mm\"\nmodulus = \"2 GPa\"");
    assert!(of(&stiff, rigid).is_none() && of(&stiff, squeezed).is_none());
    let pad = filled("name = \"gap pad\"");
    assert_eq!(of(&pad, rigid), None);
    let text = of(&pad, squeezed).expect("some kilonewtons on 6 cm²");
    assert!(text.contains("gap pad would be squeezed by"), "{text}");
    assert_eq!(gravity(squeezed), Gravity::Grave);
    let paste = filled("name = \"filled grease\"");
    assert_eq!(of(&paste, rigid), None, "a paste flows away");
}

#[test]
fn pressures_beyond_yield_are_told() {
    let code = "pressure/elastic-limits";
    let hard = with(r#"torque = "1.2 N·m""#, r#"preload = "20 kN""#);
    let found = told(&hard);
    let all: Vec<&str> = found
        .iter()
        .filter(|caution| caution.code == code)
        .map(|caution| caution.text.as_str())
        .collect();
    // 20 kN on the ring of 4.5 to 7 mm are 886 MPa; the alloy yields at 276 MPa.
    assert!(
        all.iter().any(|text| text.contains("the head presses")),
        "{all:?}"
    );
    assert!(
        all.iter().any(|text| text.contains("the faces press")),
        "{all:?}"
    );
}

#[test]
fn a_grid_too_coarse_for_its_source_is_told_in_its_own_words() {
    let code = "resistance/grid-error";
    let small = with(
        r#"finish = { process = "milled" }"#,
        "finish = { process = \"milled\" }\n\
         heated = { centre = [\"20 mm\", \"20 mm\"], diameter = \"0.2 mm\" }",
    );
    let text = of(&told(&small), code).expect("lines are a millimetre apart at the source");
    assert!(
        text.contains("the fast grid") && !text.contains("plan grid"),
        "{text}"
    );
}

#[test]
fn a_zone_far_smaller_than_a_cell_is_told() {
    let code = "resistance/narrow-zone";
    let heated = |size: &str| {
        let zone = format!("heated = {{ centre = [\"20 mm\", \"20 mm\"], diameter = \"{size}\" }}");
        told(&with(
            r#"finish = { process = "milled" }"#,
            &format!("finish = {{ process = \"milled\" }}\n{zone}"),
        ))
    };
    let text = of(&heated("0.2 mm"), code).expect("far below its plate's thickness");
    // 0.4732/(k √A) of 0.2 mm is the number, by hand for 167 W/(m K) 16 K/W; a hundredth is squeezed out
    // of sight at that width.
    let low = text
        .split("up to ")
        .nth(1)
        .and_then(|rest| rest.split(' ').next());
    let low: f64 = low.expect("a number").parse().expect("a number");
    assert!((14.0..17.0).contains(&low), "{text}");
    // Wider than 1.5 thicknesses of 4 mm.
    assert_eq!(of(&heated("7 mm"), code), None);
    assert_eq!(gravity(code), Gravity::Range);
}
