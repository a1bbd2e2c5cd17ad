//! Good joint files and what they become.

#[path = "reader/advice.rs"]
mod advice;
#[path = "reader/fillers.rs"]
mod fillers;
#[path = "reader/heat.rs"]
mod heat;
#[path = "reader/loads.rs"]
mod loads;
#[path = "reader/plates.rs"]
mod plates;
#[path = "reader/sandwich.rs"]
mod sandwich;
#[path = "reader/stacks.rs"]
mod stacks;
#[path = "reader/variants.rs"]
mod variants;

use std::{fmt::Write, fs, path::PathBuf, time::Instant};

use proptest::prelude::*;
use ringsum::{
    diagnostic::Colour,
    joint::{
        self, Bounds, ConeRule, ConeShape, Engagement, FillerKind, Friction, Joint, Law, Medium,
        Outline, Plane, RequirementKind, Sink, Source, Tightening, Zone,
    },
};

fn reference(name: &str) -> String {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests/data/joints");
    fs::read_to_string(folder.join(name)).expect("the reference file is kept")
}

fn read(text: &str) -> Joint {
    read_with(text, &[])
}

fn read_with(text: &str, sets: &[&str]) -> Joint {
    let sets: Vec<String> = sets.iter().map(|set| (*set).to_owned()).collect();
    match joint::read_with(text, &sets) {
        Ok(joint) => joint,
        Err(faults) => panic!("{}", faults.shown("joint.toml", Colour::Plain)),
    }
}

fn codes(text: &str) -> Vec<&'static str> {
    let faults = joint::read(text).expect_err("the file is faulty");
    faults.into_iter().map(|fault| fault.code).collect()
}

fn near(value: f64, expected: f64) -> bool {
    // Reading only scales by powers of ten: rounding is all that may differ.
    (value - expected).abs() <= 1e-12 * expected.abs()
}

fn at(point: [f64; 2], expected: [f64; 2]) -> bool {
    near(point[0], expected[0]) && near(point[1], expected[1])
}

const SERVICE: &str = "[service]\nmedium = \"vacuum\"\n";
const PLATES: &str = "
[[plate]]
name = \"box\"
material = \"Al 6061-T6\"
thickness = \"5 mm\"
size = [\"80 mm\", \"60 mm\"]
finish = \"milled\"

[[plate]]
name = \"panel\"
material = \"Al 6061-T6\"
thickness = \"5 mm\"
size = [\"80 mm\", \"60 mm\"]
finish = \"milled\"
";
const FASTENER: &str = "
[fastener]
thread = \"M4\"
grade = \"8.8\"
head = \"socket\"
torque = \"2 N·m\"
at = [[\"10 mm\", \"10 mm\"], [\"70 mm\", \"50 mm\"]]
";

fn plain() -> String {
    [SERVICE, PLATES, FASTENER].concat()
}

const REFERENCES: [&str; 4] = [
    "case_i.toml",
    "case_ii_flat.toml",
    "case_ii_concave30.toml",
    "round_single.toml",
];

#[test]
fn reference_joints_are_accepted_as_they_stand() {
    for name in REFERENCES {
        assert!(!read(&reference(name)).title.is_empty(), "{name}");
    }
}

#[test]
fn the_first_reference_joint_becomes_what_it_says() {
    let joint = read(&reference("case_i.toml"));
    let upper = joint.warm();
    assert!(near(upper.thickness, 5e-3));
    assert_eq!(upper.outline, Outline::Rectangle { size: [0.08, 0.08] });
    assert!(near(upper.finish.roughness.nominal, 1.13137e-6));
    assert!(near(upper.finish.slope, 0.106_066));
    assert!(near(upper.material.conductivity.value, 167.0));
    assert!(near(upper.material.expansion.value, 23.6e-6));
    assert!(at(joint.cold().origin, [0.0, 0.0]));
    assert_eq!(joint.sink, Sink::Film(2000.0).into());
    let zone = Zone::Rectangle {
        centre: [0.04, 0.04],
        size: [0.04, 0.04],
    };
    let isothermal = false;
    assert_eq!(joint.source, Source { zone, isothermal }.into());
    assert_eq!(joint.contact.law, Law::PlasticPower);
    assert_eq!(joint.contact.cone, ConeRule::Fitted);
    assert_eq!(joint.contact.shape, ConeShape::Fitted);
    assert_eq!(joint.service.heat, Some(50.0));
    assert_eq!(joint.service.medium, Medium::Vacuum);
    let bolts = &joint.fasteners[0];
    assert_eq!(bolts.tightening, Tightening::Preload(Bounds::exact(5e3)));
    assert!(near(bolts.head_seat.outer_radius, 4.25e-3));
    assert!(near(bolts.head_seat.inner_radius, 2.75e-3));
    assert_eq!(bolts.nut_seat, Some(bolts.head_seat));
    assert!(near(bolts.hole_radius[0], 2.75e-3));
    assert!(!bolts.shank_path);
    assert_eq!(joint.bolts().count(), 4);
}

#[test]
fn concave_is_a_positive_bow() {
    let bow = read(&reference("case_ii_concave30.toml")).warm().bow;
    assert!(bow.is_some_and(|bow| near(bow, 30e-6)), "{bow:?}");
}

#[test]
fn a_round_plate_counts_from_its_centre() {
    let joint = read(&reference("round_single.toml"));
    assert_eq!(joint.warm().outline, Outline::Disc { radius: 0.03 });
    assert!(at(joint.cold().origin, [0.0, 0.0]));
    assert_eq!(joint.sink, Sink::IsothermalBack.into());
    assert_eq!(
        joint.source.alone().map(|source| source.zone),
        Some(Zone::Face)
    );
}

/// The sketch of a converter box on a panel, with nearly every key.
const FULL: &str = r#"
#:schema ./joint.schema.json
format = 1
title = "Converter box on shear panel"

[service]
medium = "air"
pressure = "1 bar"
temperature = { hot = "50 °C", cold = "-20 °C", assembly = "20 °C" }
heat = "22 W"
require = { rise = "5 K", of = "hottest" }

[[plate]]
name = "base"
material = { like = "Al 6061-T6", conductivity = ["155 W/(m·K)", "167 W/(m·K)", "180 W/(m·K)"] }
thickness = "5 mm"
size = ["160 mm", "120 mm"]
finish = { roughness = ["Ra 0.6 µm", "Ra 1.0 µm"], flatness = "0.10 mm", plating = "none" }
heated = { centre = ["80 mm", "60 mm"], size = ["60 mm", "60 mm"] }

[[plate]]
name = "panel"
material = "Al 7075-T7351"
thickness = "4 mm"
size = ["300 mm", "300 mm"]
offset = ["70 mm", "90 mm"]
finish = { roughness = "Ra 1.6 µm", flatness = "0.10 mm" }
cooled = { film = "500 W/(m²·K)" }

[contact]
law = "elastic-plastic"
cone = "30 °"
shape = "polynomial"
head_model = "uniform"
faces = "frictionless"
compliance = "hard"
emissivity = { base = 0.05, panel = 0.2 }

[[fastener]]
thread = "M4"
grade = "A2-70"
head = "socket"
washer = "ISO 7089"
hole = { base = "4.5 mm" }
engagement = { kind = "insert", length = "4 mm" }
torque = { value = "1.7 N·m", tolerance = "5 %", running = "0.15 N·m" }
friction = { class = "B" }
at = [["7 mm", "7 mm"], ["153 mm", "7 mm"], ["7 mm", "113 mm"], ["153 mm", "113 mm"]]
count = 4

[[fastener]]
thread = "M5"
grade = "A2-70"
head = "ISO 4762"
engagement = "tapped"
torque = "30 in·lbf"
friction = { nut_factor = [0.16, 0.2, 0.24] }
pattern = { kind = "grid", count = [2, 1], first = ["40 mm", "30 mm"], pitch = ["80 mm", "60 mm"] }

[filler]
model = "paste"
conductivity = "3 W/(m·K)"
yield_stress = "150 Pa"
thinnest = "30 µm"
applied = "80 µm"
scatter = "25 %"

[losses]
settling = "guide"
relaxation = "5 %"
"#;

#[test]
fn the_sketch_of_the_design_reads_whole() {
    let joint = read(FULL);
    let names: Vec<_> = joint.service.cases.iter().map(|case| case.name).collect();
    assert_eq!(names, ["hot", "cold"]);
    assert!(near(joint.service.cases[1].temperature, 253.15));
    let require = joint.service.require.expect("it is stated");
    assert_eq!(require.kind, RequirementKind::HottestRise);
    assert!(matches!(&joint.service.medium, Medium::Gas { pressure, .. } if near(*pressure, 1e5)));
    assert_eq!(
        joint.warm().material.conductivity.range,
        Some([155.0, 180.0])
    );
    // The mean of Ra 0.6 and 1.0 µm times √(π/2).
    let roughness = joint.warm().finish.roughness;
    assert!(
        (roughness.nominal / 1.2533e-6 / 0.8 - 1.0).abs() < 1e-4,
        "{roughness:?}"
    );
    assert!(roughness.low < roughness.nominal && roughness.nominal < roughness.high);
    assert!(at(joint.cold().origin, [-0.07, -0.09]));
    assert!(at(joint.contact.emissivity[0], [0.05, 0.2]));
    assert!(
        matches!(joint.contact.cone, ConeRule::HalfAngle(angle) if near(angle, 30_f64.to_radians()))
    );
    let [inserts, tapped] = joint.fasteners.as_slice() else {
        panic!("two groups are stated");
    };
    assert_eq!(inserts.engagement, Engagement::Insert { length: 4e-3 });
    assert_eq!(inserts.nut_seat, None);
    assert!(inserts.washer_thickness > 0.0);
    // ISO 7089 M4: 9 mm wide, 0.8 mm thick; ISO 4762 M4: dw 6.53 mm; the spread is the smaller.
    assert!((inserts.head_seat.outer_radius - f64::midpoint(6.53e-3, 1.6 * 0.8e-3)).abs() < 1e-5);
    assert!(inserts.friction_radius < inserts.head_seat.outer_radius);
    assert!(near(inserts.hole_radius[1], 2e-3));
    assert_eq!(tapped.engagement, Engagement::Tapped { length: 4e-3 });
    assert_eq!(tapped.places.len(), 2);
    assert!(matches!(&tapped.tightening, Tightening::Torque(torque)
            if (torque.torque - 30.0 * 0.112_984_829).abs() < 1e-8
                && matches!(torque.friction, Friction::NutFactor(k) if near(k.high, 0.24))));
    let filler = joint.filler(0).expect("it is stated");
    assert!(near(filler.factor, 1.25));
    assert!(matches!(filler.kind, FillerKind::Paste { applied, .. } if near(applied, 80e-6)));
    let losses = joint.losses.expect("they are stated");
    // `guide` leaves the sum to the stack of each bolt.
    assert_eq!(losses.settling, None);
}

#[test]
fn what_is_not_stated_is_an_assumption() {
    let joint = read(&plain());
    let fields: Vec<_> = joint
        .assumptions
        .iter()
        .map(|assumption| assumption.field.as_str())
        .collect();
    for field in [
        "plate.box.finish.roughness",
        "plate.box.finish.slope",
        "plate.box.finish.flatness",
        "plate.box.heated",
        "plate.panel.cooled",
        "plate.panel.emissivity",
        "service.temperature.sink",
        "service.temperature.assembly",
        "fastener.friction",
        "fastener.torque.tolerance",
        "fastener.torque.running",
        "fastener.engagement",
        "fastener.hole",
    ] {
        assert!(fields.contains(&field), "{field} is missing in {fields:?}");
    }
    for assumption in &joint.assumptions {
        assert!(
            !assumption.value.is_empty() && !assumption.why.is_empty(),
            "{assumption:?}"
        );
    }
}

#[test]
fn nothing_stated_is_assumed() {
    let joint = read(FULL);
    let fields: Vec<_> = joint.assumptions.iter().map(|a| a.field.as_str()).collect();
    for stated in [
        "service.temperature.assembly",
        "fastener[1].torque.tolerance",
        "filler.scatter",
    ] {
        assert!(!fields.contains(&stated), "{fields:?}");
    }
}

#[test]
fn a_single_friction_value_is_widened_and_said_so() {
    let text = plain().replace("torque =", "friction = { nut_factor = 0.2 }\ntorque =");
    let joint = read(&text);
    let Tightening::Torque(torque) = &joint.fasteners[0].tightening else {
        panic!("a torque is stated");
    };
    assert!(
        matches!(torque.friction, Friction::NutFactor(k) if near(k.low, 0.15) && near(k.high, 0.25))
    );
    assert!(
        joint
            .assumptions
            .iter()
            .any(|a| a.field == "fastener.friction.nut_factor")
    );
}

#[test]
fn a_preload_may_be_a_range_in_three_ways() {
    let expected = Tightening::Preload(Bounds::uniform([4e3, 5e3, 6e3]));
    for preload in [
        "[\"4 kN\", \"6 kN\"]",
        "[\"4 kN\", \"5 kN\", \"6 kN\"]",
        "{ low = \"4 kN\", nominal = \"5 kN\", high = \"6 kN\" }",
    ] {
        let text = plain().replace("torque = \"2 N·m\"", &format!("preload = {preload}"));
        assert_eq!(read(&text).fasteners[0].tightening, expected, "{preload}");
    }
    let text = plain().replace(
        "torque = \"2 N·m\"",
        "preload = \"5 kN\"\nscatter = \"20 %\"",
    );
    assert_eq!(read(&text).fasteners[0].tightening, expected);
}

#[test]
fn requirements_name_their_planes() {
    for (require, kind) in [
        (
            "{ resistance = \"0.3 K/W\" }",
            RequirementKind::Resistance(Plane::SourceToSink),
        ),
        (
            "{ conductance = \"3 W/K\", of = \"node_to_node\" }",
            RequirementKind::Conductance(Plane::NodeToNode),
        ),
        (
            "{ resistance = \"0.3 K/W\", of = \"contact\" }",
            RequirementKind::Resistance(Plane::Contact),
        ),
    ] {
        let text = plain().replace(
            "\"vacuum\"\n",
            &format!("\"vacuum\"\nrequire = {require}\n"),
        );
        assert_eq!(
            read(&text).service.require.map(|require| require.kind),
            Some(kind)
        );
    }
    // A rise needs the heat, and a resistance has no hottest point.
    let rise = plain().replace("\"vacuum\"\n", "\"vacuum\"\nrequire = { rise = \"5 K\" }\n");
    assert_eq!(codes(&rise), ["file/missing-key"]);
    let of = "\"vacuum\"\nrequire = { resistance = \"1 K/W\", of = \"hottest\" }\n";
    assert_eq!(
        codes(&plain().replace("\"vacuum\"\n", of)),
        ["file/conflict"]
    );
}

// Half of the sides of 80 and 60 mm is 40 and 30 mm; a disc of 60 mm has 30 mm. Beyond, the first bolt would
// stand where the last one should.
#[test]
fn a_margin_past_the_middle_is_refused() {
    let at = "at = [[\"10 mm\", \"10 mm\"], [\"70 mm\", \"50 mm\"]]";
    let with = |pattern: &str| plain().replace(at, &format!("pattern = {pattern}"));
    assert!(plain().contains(at));
    for pattern in [
        "{ kind = \"grid\", count = [2, 1], margin = \"55 mm\" }",
        "{ kind = \"edge\", count = [3, 2], margin = \"41 mm\" }",
    ] {
        assert_eq!(codes(&with(pattern)), ["value/range"], "{pattern}");
    }
    // One bolt along a side stands in its middle, whatever the margin.
    read(&with(
        "{ kind = \"grid\", count = [2, 1], margin = \"31 mm\" }",
    ));
    let round = with("{ kind = \"circle\", count = 3, margin = \"40 mm\" }")
        .replace("size = [\"80 mm\", \"60 mm\"]", "diameter = \"60 mm\"");
    assert_eq!(codes(&round), ["value/range"]);
}

#[test]
fn patterns_place_the_bolts() {
    let at = "at = [[\"10 mm\", \"10 mm\"], [\"70 mm\", \"50 mm\"]]";
    let count = |pattern: &str| {
        let joint = read(&plain().replace(at, &format!("pattern = {pattern}")));
        joint.fasteners[0].places.clone()
    };
    let grid = count("{ kind = \"grid\", count = [3, 2], margin = \"10 mm\" }");
    assert_eq!(grid.len(), 6);
    assert!(near(grid[1][0], 0.04) && near(grid[5][1], 0.05), "{grid:?}");
    assert_eq!(
        count("{ kind = \"edge\", count = [4, 3], margin = \"8 mm\" }").len(),
        10
    );
    let circle = count("{ kind = \"circle\", count = 4, diameter = \"40 mm\" }");
    assert!(
        near(circle[0][0], 0.06) && near(circle[0][1], 0.03),
        "{circle:?}"
    );
    assert!(near(circle[1][1], 0.05), "{circle:?}");
}

#[test]
fn plates_of_unequal_outline_are_centred() {
    let text = plain().replacen(
        "size = [\"80 mm\", \"60 mm\"]\nfinish = \"milled\"\n\n[fast",
        "size = [\"100 mm\", \"100 mm\"]\nfinish = \"milled\"\n\n[fast",
        1,
    );
    let joint = read(&text);
    assert!(near(joint.cold().origin[0], -0.01) && near(joint.cold().origin[1], -0.02));
    assert!(
        joint
            .assumptions
            .iter()
            .any(|a| a.field == "plate.panel.offset")
    );
}

#[test]
fn a_material_of_the_file_may_start_from_the_catalogue() {
    let own =
        "[[material]]\nname = \"mine\"\nlike = \"Al 6061-T6\"\nconductivity = \"150 W/(m·K)\"\n";
    let text = plain().replacen("\"Al 6061-T6\"", "\"mine\"", 1) + own;
    let joint = read(&text);
    assert_eq!(joint.warm().material.name, "mine");
    assert!(near(joint.warm().material.conductivity.value, 150.0));
    assert_eq!(joint.warm().material.conductivity_fit, None);
    assert!(joint.warm().material.hardness.is_some());
    // Stated conductivity holds at room temperature; in the cold it must be said to hold.
    let cold = text
        .replace("\"vacuum\"\n", "\"vacuum\"\ntemperature = \"77 K\"\n")
        .replace("8.8", "A2-70");
    assert_eq!(codes(&cold), ["material/cold-data"]);
    let held = cold + "expansion = \"18 µm/(m·K)\"\nvalid_from = \"70 K\"\n";
    let material = read(&held).warm().material.clone();
    let conductivity = material.conductivity_at(77.0).expect("it is said to hold");
    // A power of ten of a logarithm: a few roundings.
    assert!((conductivity - 150.0).abs() < 1e-9);
    let contraction = material
        .contraction_between(293.0, 77.0)
        .expect("it is said to hold");
    assert!((contraction + 18e-6 * 216.0).abs() < 2e-5, "{contraction}");
}

#[test]
fn the_order_of_tables_does_not_matter() {
    let parts = [
        SERVICE,
        PLATES,
        FASTENER,
        "\n[contact]\nlaw = \"plastic\"\n",
        "\n[losses]\nrelaxation = \"3 %\"\n",
    ];
    let joint = read(&parts.concat());
    let mut turned = parts;
    for _ in 0..parts.len() {
        turned.rotate_left(1);
        assert_eq!(read(&turned.concat()), joint);
    }
    turned.reverse();
    assert_eq!(read(&turned.concat()), joint);
}

#[test]
fn line_ends_and_byte_order_marks_do_not_matter() {
    let joint = read(FULL);
    assert_eq!(read(&FULL.replace('\n', "\r\n")), joint);
    assert_eq!(read(&format!("\u{feff}{FULL}")), joint);
}

#[test]
fn overrides_act_on_any_field() {
    let text = plain();
    let sets = [
        "plate.box.thickness=\"6 mm\"",
        "plate[2].thickness=7 mm",
        "fastener.torque.tolerance = 10 %",
        "fastener.grade=10.9",
        "service.heat=12 W",
        "service.temperature.assembly=15 °C",
        "contact.law=plastic",
        "title=Thicker",
        "fastener.at=[[\"20 mm\", \"20 mm\"]]",
        "plate.panel.finish.roughness=Ra 0.4 µm",
    ];
    let joint = read_with(&text, &sets);
    assert!(near(joint.warm().thickness, 6e-3) && near(joint.cold().thickness, 7e-3));
    assert!(near(
        joint.cold().finish.roughness.nominal,
        0.4e-6 * 1.253_314_137_315_5
    ));
    assert_eq!(joint.fasteners[0].grade.name, "10.9");
    assert_eq!(joint.service.heat, Some(12.0));
    assert!(near(joint.service.assembly_temperature, 288.15));
    assert_eq!(joint.contact.law, Law::Plastic);
    assert_eq!(joint.title, "Thicker");
    assert_eq!(joint.bolts().count(), 1);
    let Tightening::Torque(torque) = &joint.fasteners[0].tightening else {
        panic!("a torque is stated");
    };
    assert!(near(torque.torque, 2.0) && near(torque.tolerance, 0.1));
}

#[test]
fn an_override_of_one_plate_leaves_what_the_others_state() {
    let hole = |stated: &str| {
        let text = plain().replace("[fastener]", &format!("[fastener]\nhole = {stated}"));
        let joint = read_with(&text, &["fastener.hole.panel=\"5.7 mm\""]);
        let bolt = &joint.fasteners[0];
        [0, 1].map(|plate| 2.0 * bolt.hole_radius[plate])
    };
    for stated in [
        "\"5.8 mm\"",
        "[\"5.8 mm\", \"5.9 mm\"]",
        "{ box = \"5.8 mm\", panel = \"5.9 mm\" }",
        "{ \"*\" = \"5.8 mm\" }",
    ] {
        let [warm, cold] = hole(stated);
        assert!(
            near(warm, 5.8e-3) && near(cold, 5.7e-3),
            "{stated}: {warm} {cold}"
        );
    }
}

#[test]
fn an_override_equals_the_same_edit_of_the_file() {
    let edited = plain().replace("2 N·m", "3 N·m");
    assert_eq!(
        read_with(&plain(), &["fastener.torque=3 N·m"]),
        read(&edited)
    );
    assert_eq!(
        read_with(&plain(), &["fastener.torque.value=\"3 N·m\""]),
        read(&edited)
    );
    assert_eq!(
        read_with(&plain(), &["fastener[1].torque.value=3 N·m"]),
        read(&edited)
    );
}

#[test]
fn an_override_takes_the_place_of_what_it_excludes() {
    let joint = read_with(
        &plain(),
        &[
            "fastener.preload=3 kN",
            "plate.box.diameter=50 mm",
            "fastener.pattern.kind=circle",
            "fastener.pattern.count=3",
            "fastener.pattern.diameter=30 mm",
        ],
    );
    assert_eq!(
        joint.fasteners[0].tightening,
        Tightening::Preload(Bounds::exact(3e3))
    );
    assert_eq!(joint.warm().outline, Outline::Disc { radius: 0.025 });
    assert_eq!(joint.bolts().count(), 3);
    let joint = read_with(
        FULL,
        &[
            "fastener[1].friction.nut_factor=0.2",
            "service.temperature.sink=30 °C",
        ],
    );
    assert!(
        matches!(&joint.fasteners[0].tightening, Tightening::Torque(torque)
        if matches!(torque.friction, Friction::NutFactor(_)))
    );
    assert_eq!(joint.service.cases.len(), 1);
}

#[test]
fn plates_without_names_are_called_upper_and_lower() {
    let text = plain()
        .replace("name = \"box\"\n", "")
        .replace("name = \"panel\"\n", "");
    let joint = read_with(&text, &["plate.lower.thickness=8 mm"]);
    assert_eq!(joint.warm().name, "upper");
    assert!(near(joint.cold().thickness, 8e-3));
    assert!(
        joint
            .assumptions
            .iter()
            .any(|a| a.field == "plate.upper.finish.slope")
    );
}

#[test]
fn an_assumption_is_told_once() {
    for text in [plain(), FULL.to_owned()] {
        let joint = read(&text);
        let fields: std::collections::BTreeSet<_> =
            joint.assumptions.iter().map(|a| &a.field).collect();
        assert_eq!(
            fields.len(),
            joint.assumptions.len(),
            "{:#?}",
            joint.assumptions
        );
    }
}

#[test]
fn a_fault_in_an_override_points_into_it() {
    let sets = ["title=x".to_owned(), "plate.box.thickness=6 N".to_owned()];
    let faults = joint::read_with(&plain(), &sets).expect_err("newtons are no length");
    let (source, fault) = &faults.faults[0];
    assert_eq!((*source, fault.code), (2, "unit/not-a-quantity"));
    assert_eq!(&faults.sources[2].1[fault.span.clone()], "6 N");
}

#[test]
fn bad_overrides_are_told() {
    for set in [
        "plate.box.thicknes=6 mm",
        "plate.lid.thickness=6 mm",
        "fastener[3].preload=2 kN",
        "service[1].heat=2 W",
        "plate.box.hole.low=1 mm",
        "plate=1",
        "no equals",
        "=3",
        "a..b=3",
        "plate[x].name=3",
        "service.heat.x=3 W",
    ] {
        let faults = joint::read_with(&plain(), &[set.to_owned()]).expect_err(set);
        assert!(
            faults
                .faults
                .iter()
                .any(|(source, fault)| *source == 1 && fault.code == "set/bad-override"),
            "{set}: {faults:?}"
        );
    }
}

#[test]
fn an_override_that_leaves_out_the_table_is_shown_where_the_field_is() {
    let help = |set: &str| {
        let faults = joint::read_with(&plain(), &[set.to_owned()]).expect_err(set);
        faults.faults[0].1.help.clone().expect("a way on")
    };
    for (set, expected) in [
        ("torque=9 N m", "fastener.torque"),
        ("torqe=9 N m", "fastener.torque"),
        ("thickness=2 mm", "plate.box.thickness"),
        ("medium=vacuum", "service.medium"),
    ] {
        assert!(
            help(set).contains(&format!("`{expected}`")),
            "{set}: {}",
            help(set)
        );
        // What is shown is taken.
        let (_, value) = set.split_once('=').expect("a value");
        let shown = format!("{expected}={value}");
        assert!(joint::read_with(&plain(), &[shown]).is_ok(), "{expected}");
    }
    // What no table has is answered with what may stand here.
    assert!(help("zebra=1").contains("known are"));
}

#[test]
fn the_schema_in_the_repository_is_that_of_the_fields() {
    let path = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("joints/joint.schema.json");
    let schema = serde_json::to_string_pretty(&joint::schema()).expect("JSON") + "\n";
    if std::env::var("SNAPSHOTS").is_ok_and(|value| value == "overwrite") {
        fs::write(&path, &schema).expect("the folder can be written");
    }
    let kept = fs::read_to_string(&path).expect("the schema is kept");
    assert!(
        kept == schema,
        "run `SNAPSHOTS=overwrite cargo test --test reader schema`"
    );
}

#[test]
fn ten_thousand_bolts_are_read_and_one_more_is_not() {
    let many = |count: usize| {
        let mut at = String::from("at = [");
        for bolt in 0..count {
            let (x, y) = (10 + 10 * (bolt % 100), 10 + 10 * (bolt / 100));
            write!(at, "[\"{x} mm\", \"{y} mm\"], ").expect("a string takes text");
        }
        let text = plain().replace("[\"80 mm\", \"60 mm\"]", "[\"2 m\", \"2 m\"]");
        let start = text.find("at = ").expect("places are stated");
        text[..start].to_owned() + &at + "]\n"
    };
    assert_eq!(read(&many(10_000)).bolts().count(), 10_000);
    assert_eq!(codes(&many(10_001)), ["file/too-many"]);
}

#[test]
fn a_file_of_six_bolts_reads_in_two_milliseconds() {
    let text = reference("case_ii_flat.toml");
    read(&text);
    let best = (0..20)
        .map(|_| {
            let start = Instant::now();
            read(&text);
            start.elapsed()
        })
        .min()
        .expect("twenty readings");
    // Without optimisation the reader is about ten times slower.
    let limit = if cfg!(debug_assertions) { 20 } else { 2 };
    assert!(best.as_millis() < limit, "{best:?}");
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 300,
        rng_seed: proptest::test_runner::RngSeed::Fixed(1),
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    #[test]
    fn no_text_makes_the_reader_panic(text in "\\PC*", set in "\\PC*") {
        let _ = joint::read(&text);
        let _ = joint::read_with(&text, std::slice::from_ref(&set));
        let _ = joint::read_with(&plain(), &[set]);
    }

    #[test]
    fn no_toml_like_text_makes_the_reader_panic(
        lines in proptest::collection::vec(
            "(\\[{0,2}(plate|fastener|service|material|contact|filler|measured|losses)\\]{0,2}|[a-z_.]{1,12} ?= ?(\"[0-9.]{1,4} ?[a-zµ°%/()·]{0,6}\"|[0-9.e-]{1,6}|\\[\"[0-9]{1,3} mm\", ?\"1 mm\"\\]|\\{[a-z]{1,8} = [0-9]\\}|true))",
            0..20,
        )
    ) {
        let _ = joint::read(&lines.join("\n"));
    }

    #[test]
    fn no_damage_to_a_good_file_makes_the_reader_panic(
        file in 0..5_usize,
        at in 0.0..1.0_f64,
        length in 0..30_usize,
        patch in "(\\PC{0,8}|[0-9]{0,3}|\"|\\[|\\]|\\{|\\}|nan|inf|-1|e9|\n)",
    ) {
        let text = if file < 4 { reference(REFERENCES[file]) } else { FULL.to_owned() };
        let letters: Vec<char> = text.chars().collect();
        let start = (at * letters.len() as f64) as usize;
        let end = (start + length).min(letters.len());
        let mut damaged: String = letters[..start].iter().collect();
        damaged.push_str(&patch);
        damaged.extend(&letters[end..]);
        if let Err(faults) = joint::read_with(&damaged, &[]) {
            prop_assert!(!faults.faults.is_empty());
            for (_, fault) in &faults.faults {
                prop_assert!(damaged.get(fault.span.clone()).is_some(), "{:?}", fault);
            }
            let _ = faults.shown("joint.toml", Colour::Plain);
        }
    }
}
