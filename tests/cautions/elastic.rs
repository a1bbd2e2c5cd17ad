//! Cautions of a solved field: each produced by a joint that deserves it and not by its neighbour.

use ringsum::{
    diagnostic::{
        Caution,
        registry::{Gravity, gravity},
    },
    estimate::{Chain, Choice, Fineness, Options, Watch},
    joint, uncertainty,
};

/// A small joint of two bolts: plates of 4 and 6 mm, 50 by 30 mm.
const PLAIN: &str = r#"
title = "Two bolts"
[service]
medium = "vacuum"
temperature = "20 °C"
heat = "10 W"
[[plate]]
name = "upper"
material = "Al 6061-T6"
thickness = "4 mm"
size = ["50 mm", "30 mm"]
finish = { process = "milled" }
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "6 mm"
size = ["50 mm", "30 mm"]
finish = { process = "milled" }
cooled = { film = "500 W/(m²·K)" }
[fastener]
thread = "M4"
grade = "A2-70"
head = "socket"
hole = "4.5 mm"
torque = "1.2 N·m"
engagement = { kind = "nut" }
at = [["10 mm", "15 mm"], ["40 mm", "15 mm"]]
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

#[test]
fn a_solved_field_is_not_told_what_cone_and_plan_grid_leave_out() {
    // Cooled at the rim, heated on less than three thicknesses: both are matters of the plan grid.
    let text = with(r#"{ film = "500 W/(m²·K)" }"#, r#"{ edge = "rim" }"#).replacen(
        r#"finish = { process = "milled" }"#,
        "finish = { process = \"milled\", flatness = \"20 µm\" }\n\
         heated = { centre = [\"25 mm\", \"15 mm\"], size = [\"10 mm\", \"10 mm\"] }",
        1,
    );
    let found = told(&text);
    for code in [
        "resistance/cell",
        "resistance/edge-sink",
        "resistance/small-source",
        "pressure/flatness-ignored",
        "pressure/tapped-cone",
        "pressure/filler-spreads",
    ] {
        assert_eq!(of(&found, code), None, "{code}");
    }
    let joint = joint::read(&text).expect("a good joint");
    let options = Options { draws: 0, seed: 1 };
    let cone = uncertainty::estimate(&joint, &options).expect("a number");
    for code in [
        "resistance/cell",
        "resistance/edge-sink",
        "resistance/small-source",
    ] {
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
    let near = with(r#"at = [["10 mm", "15 mm"]"#, r#"at = [["4 mm", "15 mm"]"#);
    let text = of(&told(&near), code).expect("the head ends 0.5 mm inside the edge");
    assert!(text.contains("at (0.0, "), "{text}");
    // A pad gives way at its edge.
    let soft = near + "[filler]\nname = \"gap pad\"\n";
    assert_eq!(of(&told(&soft), code), None);
}

#[test]
fn heads_beside_their_feet_are_told_gravely() {
    let code = "pressure/head-off-foot";
    let feet = |first: &str| {
        with(
            r#"size = ["50 mm", "30 mm"]"#,
            &format!(
                "size = [\"50 mm\", \"30 mm\"]\nfeet = {{ height = \"1 mm\", at = [\n\
                 {{ centre = [\"{first}\", \"15 mm\"], diameter = \"12 mm\" }},\n\
                 {{ centre = [\"40 mm\", \"15 mm\"], diameter = \"12 mm\" }},\n] }}"
            ),
        )
    };
    assert_eq!(of(&told(&feet("10 mm")), code), None);
    let beside = of(&told(&feet("22 mm")), code).expect("the foot begins 6 mm from the axis");
    assert!(
        beside.contains("at 1 of these") && beside.contains("only 0 %"),
        "{beside}"
    );
    let partly = of(&told(&feet("14 mm")), code).expect("the foot ends 2 mm from the axis");
    assert!(!partly.contains("only 0 %"), "{partly}");
    assert_eq!(gravity(code), Gravity::Grave);
}

#[test]
fn a_layer_without_a_modulus_is_told_to_press_like_bare_plates() {
    let code = "pressure/filler-rigid";
    let filled = |lines: &str| told(&format!("{PLAIN}[filler]\n{lines}\n"));
    let layer = "conductivity = \"3 W/(m·K)\"\nthickness = \"0.5 mm\"";
    assert!(of(&filled("name = \"indium foil\""), code).is_some());
    assert!(of(&filled(layer), code).is_some());
    assert_eq!(
        of(&filled(&format!("{layer}\nmodulus = \"2 GPa\"")), code),
        None
    );
    assert_eq!(of(&filled("name = \"filled grease\""), code), None);
}

#[test]
fn pressures_beyond_yield_are_told() {
    let code = "pressure/elastic-limits";
    let hard = with(r#"torque = "1.2 N·m""#, r#"preload = "12 kN""#);
    let found = told(&hard);
    let all: Vec<&str> = found
        .iter()
        .filter(|caution| caution.code == code)
        .map(|caution| caution.text.as_str())
        .collect();
    // 12 kN on the ring of 4.5 to 7 mm are 531 MPa; the alloy yields at 276 MPa.
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
fn a_pad_pressed_flat_is_told_gravely() {
    let code = "pressure/layer-squeezed";
    let pad = |modulus: &str| {
        told(&format!(
            "{PLAIN}[filler]\nname = \"gap pad\"\nmodulus = \"{modulus}\"\n"
        ))
    };
    let text = of(&pad("0.5 MPa"), code).expect("some kilonewtons on 15 cm²");
    assert!(text.contains("gap pad would be squeezed by"), "{text}");
    assert_eq!(of(&pad("1 GPa"), code), None);
    assert_eq!(gravity(code), Gravity::Grave);
}

#[test]
fn a_grid_too_coarse_for_its_source_is_told_in_its_own_words() {
    let code = "resistance/grid-error";
    let small = PLAIN
        .replacen(r#"size = ["50 mm", "30 mm"]"#, r#"size = ["150 mm", "30 mm"]"#, 2)
        .replacen(r#"thickness = "4 mm""#, r#"thickness = "1 mm""#, 1)
        .replacen(r#""Al 6061-T6""#, r#""304""#, 1)
        .replacen(r#"["40 mm", "15 mm"]"#, r#"["20 mm", "15 mm"]"#, 1)
        .replacen(
            r#"finish = { process = "milled" }"#,
            "finish = { process = \"milled\" }\n\
             heated = { centre = [\"120 mm\", \"15 mm\"], diameter = \"1 mm\" }",
            1,
        );
    let text = of(&told(&small), code).expect("lines are millimetres apart at the source");
    assert!(
        text.contains("the fast grid") && !text.contains("plan grid"),
        "{text}"
    );
}
