//! Cautions of load, springs, inserts and brittle plates, each from a joint that calls for it.

use ringsum::{
    diagnostic::Caution,
    estimate::{Estimate, Options},
    joint, uncertainty,
};

/// A joint of two M5 between a plate of some material and aluminium.
fn estimate((plate, fastener, further): (&str, &str, &str)) -> Estimate {
    let text = format!(
        r#"
title = "Strength"
[service]
medium = "vacuum"
temperature = "20 °C"
heat = "5 W"
[[plate]]
name = "upper"
{plate}
thickness = "3 mm"
size = ["60 mm", "30 mm"]
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "10 mm"
size = ["60 mm", "30 mm"]
finish = {{ process = "milled", flatness = "10 µm" }}
cooled = {{ face = "isothermal" }}
[fastener]
thread = "M5"
grade = "8.8"
head = "socket"
{fastener}
at = [["15 mm", "15 mm"], ["45 mm", "15 mm"]]
{further}
"#
    );
    let joint = joint::read(&text).unwrap_or_else(|faults| panic!("{faults:#?}"));
    let options = Options { draws: 0, seed: 1 };
    uncertainty::estimate(&joint, &options).expect("a number")
}

fn cautions(of: (&str, &str, &str)) -> Vec<Caution> {
    estimate(of).cautions
}

const ALUMINIUM: &str =
    "material = \"Al 6061-T6\"\nfinish = { process = \"milled\", flatness = \"10 µm\" }";
const CERAMIC: &str = "material = \"AlN\"\nfinish = { process = \"lapped\", flatness = \"10 µm\" }";
const TAPPED: &str = "torque = \"3 N·m\"\nengagement = { kind = \"tapped\", length = \"10 mm\" }";

fn text_of(code: &str, of: (&str, &str, &str)) -> Option<String> {
    let found = cautions(of).into_iter().find(|each| each.code == code);
    found.map(|caution| caution.text)
}

#[test]
fn a_load_that_may_part_the_faces_is_told_with_its_factor() {
    let with = |load: &str| {
        let fastener = format!("{TAPPED}\naxial_load = {{ value = \"{load}\", lasting = false }}");
        text_of("preload/separation", (ALUMINIUM, &fastener, ""))
    };
    assert_eq!(with("50 N"), None);
    let told = with("2 kN").expect("2 kN are more than the least clamp may lose");
    assert!(
        told.contains("2000 N") && told.contains("1.2 times is asked"),
        "{told}"
    );
}

#[test]
fn what_lets_a_joint_down_is_told_whatever_the_heat_says() {
    let with = |load: &str| {
        let fastener = format!("{TAPPED}\naxial_load = {{ value = \"{load}\", lasting = false }}");
        estimate((ALUMINIUM, &fastener, "")).met_of_heat_alone()
    };
    assert_eq!(with("50 N"), None);
    assert_eq!(with("2 kN"), Some("the load may part the faces"));
}

#[test]
fn a_bolt_torn_in_service_is_told() {
    let fastener = format!(
        "{TAPPED}\naxial_load = {{ value = \"40 kN\", introduction = 1.0, lasting = false }}"
    );
    let told = text_of("preload/over-in-service", (ALUMINIUM, &fastener, ""));
    assert!(told.expect("40 kN tear an M5").contains(" % of its "));
    assert_eq!(
        text_of("preload/over-in-service", (ALUMINIUM, TAPPED, "")),
        None
    );
}

#[test]
fn springs_that_lie_flat_are_no_springs() {
    let with = |parallel: u32| {
        let fastener = format!(
            "{TAPPED}\ndisc_springs = {{ outer = \"10 mm\", inner = \"5.2 mm\", thickness = \"0.5 mm\", \
             cone_height = \"0.25 mm\", parallel = {parallel}, series = 2 }}"
        );
        text_of("preload/springs-flat", (ALUMINIUM, &fastener, ""))
    };
    // One disc is flat near 0.4 kN, twenty near 8 kN; 3 N·m clamp about 4 kN.
    assert!(with(1).is_some_and(|told| told.contains("no longer springs")));
    assert_eq!(with(20), None);
}

#[test]
fn a_split_washer_counts_for_nothing() {
    let fastener = format!("{TAPPED}\nsplit_washer = true");
    assert!(text_of("preload/split-washer", (ALUMINIUM, &fastener, "")).is_some());
    assert_eq!(
        text_of("preload/split-washer", (ALUMINIUM, TAPPED, "")),
        None
    );
}

#[test]
fn a_soft_layer_under_several_bolts_is_told() {
    let layer = "[filler]\nname = \"graphite foil\"";
    let told = text_of("preload/soft-layer", (ALUMINIUM, TAPPED, layer));
    assert!(told.is_some_and(|told| told.contains("10 % taken")));
    assert_eq!(text_of("preload/soft-layer", (ALUMINIUM, TAPPED, "")), None);
}

#[test]
fn a_brittle_plate_is_told_with_its_stresses() {
    let told = text_of("preload/brittle", (CERAMIC, TAPPED, "")).expect("AlN is brittle");
    assert!(told.contains("state its `flexural_strength`"), "{told}");
    let stated = |strength: &str| format!("{CERAMIC}\nflexural_strength = \"{strength}\"");
    let (weak, strong) = (stated("60 MPa"), stated("2 GPa"));
    assert!(text_of("preload/brittle-over", (&weak, TAPPED, "")).is_some());
    assert_eq!(text_of("preload/brittle-over", (&strong, TAPPED, "")), None);
    assert!(text_of("preload/brittle", (&strong, TAPPED, "")).is_some());
}

#[test]
fn a_stated_pull_out_limits_the_torque() {
    let with = |hold: &str| {
        let fastener = format!(
            "torque = \"3 N·m\"\nengagement = {{ kind = \"insert\", length = \"7.5 mm\", flange = \"12 mm\"{hold} }}"
        );
        let found = cautions((ALUMINIUM, &fastener, ""));
        let codes: Vec<&str> = found.iter().map(|each| each.code).collect();
        (
            codes.contains(&"preload/insert"),
            codes.contains(&"preload/never-for-conductance"),
        )
    };
    assert_eq!(with(""), (true, false));
    assert_eq!(with(", pull_out = \"20 kN\""), (false, false));
    // 3 N·m give up to about 5 kN.
    assert_eq!(with(", pull_out = \"1 kN\""), (false, true));
    // Half of π · 6.5 mm · 7.5 mm in 6061-T6 bears some 12 kN.
    assert_eq!(with(", outer = \"6.5 mm\""), (false, false));
}
