//! The screening against the closed-form chain, and its symmetries.

use crate::{
    estimate::{Chain, Realisation},
    joint,
    layout::{Measure, Size, sheets::Sheets},
};

/// Two plates under two bolts, heated all over one, cooled by a film.
const TEXT: &str = r#"
[service]
medium = "vacuum"
[[plate]]
material = "Al 6061-T6"
thickness = "4 mm"
size = ["100 mm", "30 mm"]
finish = "milled"
[[plate]]
material = "Al 6061-T6"
thickness = "4 mm"
size = ["100 mm", "30 mm"]
finish = "milled"
cooled = { film = "1000 W/(m²·K)" }
[fastener]
thread = "M5"
grade = "8.8"
head = "hex"
torque = "3 N·m"
at = [["20 mm", "15 mm"], ["80 mm", "15 mm"]]
"#;

/// The screening of the joint as it stands, and the closed-form chain.
fn both(text: &str, measure: Measure) -> [f64; 2] {
    let joint = joint::read(text).unwrap();
    let chain = Chain::new(&joint).unwrap();
    let path = chain.state(0, &Realisation::default()).unwrap().path;
    let places = joint.fasteners[0].places.clone();
    let sizes = [Size::new(None, joint.clone()).unwrap()];
    let sheets = Sheets::new(&sizes).unwrap();
    let bolts = sheets.influences(&places);
    let bolts: Vec<&_> = bolts.iter().collect();
    let links = sheets.links(&sizes[0]);
    [sheets.value(&bolts, &links, measure), measure.of(&path)]
}

#[test]
fn every_reading_stays_near_the_closed_form_chain() {
    for (measure, tolerance) in [
        // Same laws and cones; the model form of the chain and its grid differ by some percent.
        (Measure::SourceToSink, 0.12),
        (Measure::Added, 0.15),
        (Measure::NodeToNode, 0.15),
        (Measure::InterfaceDrop, 0.15),
        (Measure::Hottest, 0.15),
        // The same integral in other rings.
        (Measure::Contact, 0.02),
    ] {
        let [screened, chain] = both(TEXT, measure);
        assert!(
            (screened / chain - 1.0).abs() < tolerance,
            "{measure:?} {screened} {chain}"
        );
    }
}

#[test]
fn gas_edge_and_zone_are_carried() {
    for (from, to) in [
        ("medium = \"vacuum\"", "medium = \"air\""),
        (
            "thickness = \"4 mm\"\nsize = [\"100 mm\", \"30 mm\"]\nfinish = \"milled\"\n[[",
            "thickness = \"4 mm\"\nsize = [\"100 mm\", \"30 mm\"]\nfinish = \"milled\"\nheated = { centre = [\"30 mm\", \"15 mm\"], size = [\"20 mm\", \"10 mm\"] }\n[[",
        ),
        ("{ film = \"1000 W/(m²·K)\" }", "{ face = \"isothermal\" }"),
    ] {
        let text = TEXT.replace(from, to);
        assert_ne!(text, TEXT);
        let [screened, chain] = both(&text, Measure::SourceToSink);
        // The plan grid of the chain reads 6 to 10 % above solved joints in vacuum and is spread by
        // its model form; the screening lies below it by 18 % at most here.
        assert!(
            (screened / chain - 1.0).abs() < 0.25,
            "{to}: {screened} {chain}"
        );
    }
}

#[test]
fn two_like_bolts_are_readings_of_their_mirror() {
    let joint = joint::read(TEXT).unwrap();
    let sizes = [Size::new(None, joint).unwrap()];
    let sheets = Sheets::new(&sizes).unwrap();
    let links = sheets.links(&sizes[0]);
    let value = |places: &[[f64; 2]]| {
        let bolts = sheets.influences(places);
        let bolts: Vec<&_> = bolts.iter().collect();
        sheets.value(&bolts, &links, Measure::SourceToSink)
    };
    let one = value(&[[0.02, 0.01], [0.07, 0.02]]);
    let mirrored = value(&[[0.08, 0.01], [0.03, 0.02]]);
    // The grid is its own mirror image: only sums in another order differ.
    assert!((one / mirrored - 1.0).abs() < 1e-9, "{one} {mirrored}");
    // More bolts conduct better.
    assert!(value(&[[0.02, 0.01], [0.07, 0.02], [0.05, 0.015]]) < one);
}
