//! Plates by outline, with cut-outs, feet, ribs, flatness maps and sag.

use std::{fmt::Write, fs, path::PathBuf, time::Instant};

use ringsum::{
    diagnostic::Colour,
    joint::{
        self, Compliance, FaceFriction, Faults, HeadModel, Joint, Outline, Patch, Sag,
        read_with_files,
    },
};

use crate::{at, near, plain, read, read_with};

/// The plain joint with lines put into its first plate.
fn with(lines: &str) -> String {
    plain().replacen(
        "finish = \"milled\"",
        &format!("finish = \"milled\"\n{lines}"),
        1,
    )
}

/// The plain joint whose first plate has an outline in place of its size.
fn outlined(points: &str) -> String {
    plain().replacen(
        "size = [\"80 mm\", \"60 mm\"]",
        &format!("outline = {points}"),
        1,
    )
}

const NOTCHED: &str = r#"[["0 mm", "0 mm"], ["80 mm", "0 mm"], ["80 mm", "60 mm"],
    ["50 mm", "60 mm"], ["50 mm", "30 mm"], ["30 mm", "30 mm"], ["30 mm", "60 mm"], ["0 mm", "60 mm"]]"#;

fn read_map(text: &str, table: &str) -> Result<Joint, Faults> {
    read_with_files(text, &[], &|name| match name {
        "map.csv" => Ok(table.to_owned()),
        _ => Err("there is no such file".into()),
    })
}

fn mapped(table: &str) -> Joint {
    match read_map(&with("flatness_map = \"map.csv\""), table) {
        Ok(joint) => joint,
        Err(faults) => panic!("{}", faults.shown("joint.toml", Colour::Plain)),
    }
}

fn codes(text: &str, table: &str) -> Vec<&'static str> {
    let faults = read_map(text, table).expect_err("the file is faulty");
    faults.faults.iter().map(|(_, fault)| fault.code).collect()
}

#[test]
fn an_outline_by_points_is_read_in_either_direction() {
    let joint = read(&outlined(NOTCHED));
    let Outline::Polygon { points } = &joint.warm().outline else {
        panic!("{:?}", joint.warm().outline);
    };
    assert_eq!(points.len(), 8);
    assert!(at(points[4], [0.05, 0.03]));
    assert!(near(joint.warm().outline.area(), 4.2e-3));
    // Covered left and right of the notch, not inside it.
    assert!(joint.warm().covers([0.02, 0.05]) && joint.warm().covers([0.06, 0.05]));
    assert!(!joint.warm().covers([0.04, 0.05]));
    // The plates are centred on each other by their bounds, which are equal here.
    assert!(joint.cold().origin.iter().all(|place| place.abs() < 1e-15));
    let back =
        outlined(r#"[["0 mm", "60 mm"], ["80 mm", "60 mm"], ["80 mm", "0 mm"], ["0 mm", "0 mm"]]"#);
    assert!(near(read(&back).warm().outline.area(), 4.8e-3));
}

#[test]
fn an_outline_may_start_anywhere() {
    let text = outlined(
        r#"[["-5 mm", "-5 mm"], ["75 mm", "-5 mm"], ["75 mm", "55 mm"], ["-5 mm", "55 mm"]]"#,
    )
    .replace("[\"70 mm\", \"50 mm\"]", "[\"65 mm\", \"45 mm\"]");
    let joint = read(&text);
    assert!(at(joint.cold().origin, [-5e-3, -5e-3]));
    let [left, lower, right, upper] = joint.warm().bounds();
    assert!(at([left, lower], [-5e-3, -5e-3]) && at([right, upper], [75e-3, 55e-3]));
}

#[test]
fn five_hundred_points_are_read_in_a_moment() {
    let mut points = String::from("[");
    for index in 0..500 {
        let angle = std::f64::consts::TAU * f64::from(index) / 500.0;
        let (x, y) = (40.0 + 40.0 * angle.cos(), 30.0 + 40.0 * angle.sin());
        write!(points, "[\"{x:.6} mm\", \"{y:.6} mm\"], ").expect("a string takes text");
    }
    let text = outlined(&(points + "]"));
    let start = Instant::now();
    let joint = read(&text);
    // 125 000 pairs of edges; a few ms with optimisation, ten times that without.
    assert!(start.elapsed().as_millis() < 1000, "{:?}", start.elapsed());
    // A regular polygon of 500 corners: ½ n r² sin(2π/n), to the six decimals written.
    let area = 0.5 * 500.0 * 1.6e-3 * (std::f64::consts::TAU / 500.0).sin();
    assert!((joint.warm().outline.area() / area - 1.0).abs() < 1e-7);
}

#[test]
fn cutouts_feet_and_ribs_are_read() {
    let joint = read(&with(
        r#"cutouts = [{ centre = ["40 mm", "30 mm"], size = ["20 mm", "10 mm"] }, { outline = [["20 mm", "20 mm"], ["25 mm", "20 mm"], ["20 mm", "25 mm"]] }]
feet = { height = "3 mm", at = [{ centre = ["10 mm", "10 mm"], diameter = "16 mm" }] }
ribs = { centre = ["40 mm", "50 mm"], size = ["30 mm", "4 mm"], height = "12 mm" }"#,
    ));
    let plate = joint.warm();
    assert_eq!(plate.cutouts.len(), 2);
    assert!(near(plate.cutouts[0].area(), 2e-4) && near(plate.cutouts[1].area(), 12.5e-6));
    assert!(!plate.covers([0.04, 0.03]) && !plate.covers([0.021, 0.021]));
    let feet = plate.feet.as_ref().expect("feet are stated");
    assert!(near(feet.height, 3e-3));
    assert!(matches!(feet.at[0], Patch::Disc { radius, .. } if near(radius, 8e-3)));
    assert!(plate.stands_at([0.01, 0.017]) && !plate.stands_at([0.07, 0.05]));
    assert!(near(plate.ribs[0].height, 12e-3));
    assert!(near(plate.thickness_at([0.04, 0.05]), 17e-3));
    let fields: Vec<String> = joint
        .needs_elastic()
        .into_iter()
        .map(|need| need.0)
        .collect();
    assert_eq!(
        fields,
        ["plate.box.cutouts", "plate.box.feet", "plate.box.ribs"]
    );
}

#[test]
fn parts_stand_in_the_coordinates_of_their_plate() {
    let text = plain()
        .replace("[\"80 mm\", \"60 mm\"]\nfinish = \"milled\"\n\n[fastener]", "[\"200 mm\", \"160 mm\"]\noffset = [\"100 mm\", \"20 mm\"]\ncutouts = [{ centre = [\"140 mm\", \"50 mm\"], diameter = \"10 mm\" }]\nfinish = \"milled\"\n\n[fastener]");
    let joint = read(&text);
    // (140, 50) on the panel is (40, 30) on the box.
    assert!(!joint.cold().covers([0.04, 0.03]) && joint.cold().covers([0.04, 0.036]));
    assert!(joint.warm().covers([0.04, 0.03]));
}

#[test]
fn a_head_may_stand_beside_a_rib_and_a_thread_below_one() {
    let beside = with(
        r#"ribs = [{ centre = ["40 mm", "15 mm"], size = ["70 mm", "3 mm"], height = "12 mm" }]"#,
    );
    assert_eq!(read(&beside).warm().ribs.len(), 1);
    // In a tapped plate nothing presses on the outer face.
    let below = plain()
        .replace("torque = ", "engagement = { kind = \"tapped\", length = \"5 mm\" }\ntorque = ")
        .replace("finish = \"milled\"\n\n[fastener]", "finish = \"milled\"\nribs = [{ centre = [\"40 mm\", \"10 mm\"], size = [\"70 mm\", \"3 mm\"], height = \"12 mm\" }]\n\n[fastener]");
    assert_eq!(read(&below).cold().ribs.len(), 1);
}

#[test]
fn either_plate_may_be_bowed() {
    let text = plain().replace(
        "finish = \"milled\"",
        "finish = \"milled\"\nbow = { kind = \"convex\", height = \"20 µm\" }",
    );
    let joint = read(&text);
    for plate in &joint.plates {
        assert!(near(plate.bow.expect("a bow is stated"), -20e-6));
    }
    // Both part at the corner.
    assert!(near(joint.initial_gap(0, [0.0, 0.0]), 40e-6));
    assert!(joint.needs_elastic().is_empty());
}

#[test]
fn the_map_is_read_between_its_points() {
    let grid = "x [mm], y [mm], z [µm]\n0, 0, 0\n80, 0, 8\n0, 60, 6\n80, 60, 14\n";
    let joint = mapped(grid);
    let map = joint.warm().flatness_map.as_ref().expect("a map is stated");
    assert_eq!(map.points().len(), 4);
    assert!(near(map.height_at([0.04, 0.03]), 7e-6));
    assert!(near(map.highest(), 14e-6) && map.lowest().abs() < 1e-20);
    // The gap opens where the face is low.
    assert!(near(joint.initial_gap(0, [0.0, 0.0]), 14e-6));
    assert!(!joint.is_flat());
    let scattered =
        "# probe\n\nZ (um); X (m); Y (inch)\n0; 0; 0\n8; 8e-2; 0\n6; 0; 2.362204724409449\r\n";
    let joint = mapped(scattered);
    let map = joint.warm().flatness_map.as_ref().expect("a map is stated");
    // 60 mm in inches to 16 digits; beyond the hull the middle of the slanted side holds.
    assert!((map.height_at([0.04, 0.03]) - 7e-6).abs() < 1e-17);
    assert!((map.height_at([0.02, 0.015]) - 3.5e-6).abs() < 1e-17);
}

#[test]
fn a_hundred_thousand_points_are_read_and_one_more_is_not() {
    let table = |count: usize| {
        let mut table = String::from("x [mm], y [mm], z [µm]\n");
        for index in 0..count {
            // Two irrational steps: scattered without a repetition.
            let x = 80.0 * (index as f64 * 0.754_877_666_246_693).fract();
            let y = 60.0 * (index as f64 * 0.569_840_290_998_053).fract();
            writeln!(table, "{x:.7},{y:.7},{:.3}", 0.1 * x).expect("a string takes text");
        }
        table
    };
    let text = with("flatness_map = \"map.csv\"");
    let joint = read_map(&text, &table(100_000)).expect("as many as a map may have");
    let map = joint.warm().flatness_map.as_ref().expect("a map is stated");
    // Heights are written to a nanometre.
    assert!((map.height_at([0.04, 0.03]) - 4e-6).abs() < 1e-9);
    assert_eq!(codes(&text, &table(100_001)), ["map/points"]);
}

#[test]
fn a_fault_in_a_table_points_into_the_table() {
    let table = "x [mm], y [mm], z [µm]\n0, 0, 0\n80, zero, 8\n";
    let text = with("flatness_map = \"map.csv\"").replace("\"2 N·m\"", "\"2 N\"");
    let sets = ["title=x".to_owned()];
    let faults = read_with_files(&text, &sets, &|_| Ok(table.to_owned())).expect_err("two faults");
    let found: Vec<(usize, &str)> = faults
        .faults
        .iter()
        .map(|(source, fault)| (*source, fault.code))
        .collect();
    assert_eq!(found, [(0, "unit/not-a-quantity"), (2, "map/row")]);
    assert_eq!(faults.sources[2].0, "map.csv");
    assert_eq!(&table[faults.faults[1].1.span.clone()], "zero");
    let shown = faults.shown("joint.toml", Colour::Plain);
    assert!(shown.contains("map.csv:3:5"), "{shown}");
}

#[test]
fn a_slip_on_the_last_line_hides_no_fault_of_a_table() {
    let text = with("flatness_map = \"map.csv\"") + "[contact]\nlaw = elastic";
    let found = codes(&text, "x [mm], y [mm], z [µm]\n0, 0, high\n");
    assert_eq!(found, ["file/syntax", "map/row"]);
}

#[test]
fn without_files_a_table_is_told_to_be_missing() {
    let faults = joint::read(&with("flatness_map = \"map.csv\"")).expect_err("no file is read");
    assert_eq!(faults[0].code, "map/unreadable");
}

#[test]
fn maps_of_few_points_or_one_line_are_refused() {
    let text = with("flatness_map = \"map.csv\"");
    let head = "x [mm], y [mm], z [µm]\n";
    for rows in ["", "0,0,0\n80,0,1\n", "0,0,0\n40,30,1\n80,60,0\n"] {
        assert_eq!(
            codes(&text, &format!("{head}{rows}")),
            ["map/points"],
            "{rows}"
        );
    }
    // A probe may overrun the edge a little.
    assert!(read_map(&text, &format!("{head}-5,-5,0\n85,0,1\n0,65,0\n")).is_ok());
}

#[test]
fn sag_is_read_in_its_four_forms() {
    let sag = |sag: &str| read(&with(&format!("sag = {sag}")));
    assert_eq!(
        sag(r#"{ flux = "2 W/cm²" }"#).warm().sag,
        Some(Sag::Flux(2e4))
    );
    let curved = sag(r#"{ curvature = "-2e-5 1/mm" }"#);
    assert!(near(curved.sag_curvature(0), -0.02));
    let layered =
        sag(r#"{ bimetal = { material = "Cu OFHC", thickness = "0.5 mm", change = "-40 K" } }"#);
    // Copper shrinks less than aluminium: cooled, the outer face stays longer, and the centre lifts.
    assert!(layered.sag_curvature(0) > 0.0);
    let heated =
        with(r#"sag = { flux = "heat" }"#).replacen("\"vacuum\"", "\"vacuum\"\nheat = \"48 W\"", 1);
    let joint = read(&heated);
    assert_eq!(joint.warm().sag, Some(Sag::Heat));
    // 48 W over 80 by 60 mm are 10 kW/m².
    let by_flux = sag(r#"{ flux = "10 kW/m²" }"#);
    assert!((joint.sag_curvature(0) / by_flux.sag_curvature(0) - 1.0).abs() < 1e-12);
    assert!(
        joint
            .assumptions
            .iter()
            .any(|told| told.field == "plate.box.sag.flux")
    );
}

#[test]
fn choices_of_contact_are_read() {
    let contact = read(&plain()).contact;
    assert_eq!(contact.head_model, HeadModel::Uniform);
    assert_eq!(contact.faces, FaceFriction::Frictionless);
    assert_eq!(contact.compliance, Compliance::Hard);
    let text = plain()
        + "[contact]\nhead_model = \"rigid\"\nfaces = \"stuck\"\ncompliance = \"asperities\"\n";
    let contact = read(&text).contact;
    assert_eq!(contact.head_model, HeadModel::Rigid);
    assert_eq!(contact.faces, FaceFriction::Stuck);
    assert_eq!(contact.compliance, Compliance::Asperities);
}

#[test]
fn an_override_takes_the_place_of_what_excludes_it() {
    let joint = read_with(
        &outlined(NOTCHED),
        &["plate.box.size=[\"80 mm\", \"60 mm\"]"],
    );
    assert_eq!(
        joint.warm().outline,
        Outline::Rectangle { size: [0.08, 0.06] }
    );
    let text = with("flatness_map = \"map.csv\"");
    let joint = read_with(
        &text,
        &["plate.box.bow={ kind = \"convex\", height = \"5 µm\" }"],
    );
    assert!(joint.warm().flatness_map.is_none() && joint.warm().bow.is_some());
    let text = with(r#"cutouts = [{ centre = ["40 mm", "30 mm"], diameter = "10 mm" }]"#);
    let joint = read_with(&text, &["plate.box.cutouts[1].diameter=20 mm"]);
    assert!(near(
        joint.warm().cutouts[0].area(),
        std::f64::consts::PI * 1e-4
    ));
}

#[test]
fn the_joints_beyond_the_cone_say_what_they_need() {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("joints");
    let needs = |name: &str| -> Vec<String> {
        let text = fs::read_to_string(folder.join(name)).expect("the joint is there");
        let table = |name: &str| fs::read_to_string(folder.join(name)).map_err(|e| e.to_string());
        let joint = read_with_files(&text, &[], &table).expect("a good joint");
        joint
            .needs_elastic()
            .into_iter()
            .map(|need| need.0)
            .collect()
    };
    assert_eq!(
        needs("bracket_feet.toml"),
        [
            "plate.base.outline",
            "plate.base.feet",
            "plate.panel.cutouts",
            "plate.panel.ribs"
        ]
    );
    assert_eq!(
        needs("bowed_base.toml"),
        ["plate.base.flatness_map", "plate.base.sag"]
    );
}
