//! Heated zones, cooled parts, layered plates and isolating washers.

use ringsum::joint::{
    CooledPart, Cooling, Edge, HeatedZone, Heating, Sink, Source, Zone, read_with_files,
};

use crate::{at, near, plain, read, read_with};

/// The plain joint with lines put into its first and its second plate.
fn with(upper: &str, lower: &str) -> String {
    let finish = "finish = \"milled\"";
    let mut parts = plain()
        .split(finish)
        .map(str::to_owned)
        .collect::<Vec<String>>();
    assert_eq!(parts.len(), 3, "two plates");
    parts[1].insert_str(0, &format!("{finish}\n{upper}"));
    parts[2].insert_str(0, &format!("{finish}\n{lower}"));
    parts.concat()
}

const TWO: &str = r#"heated = [
    { centre = ["20 mm", "30 mm"], diameter = "10 mm", heat = "12 W" },
    { centre = ["60 mm", "30 mm"], size = ["10 mm", "20 mm"], heat = "8 W" },
]"#;

#[test]
fn zones_bring_their_heat() {
    let joint = read(&with(TWO, ""));
    assert!(near(joint.service.heat.expect("the sum"), 20.0));
    assert!(
        joint
            .assumptions
            .iter()
            .any(|each| each.field == "service.heat" && each.value == "20 W")
    );
    let disc = Zone::Disc {
        centre: [0.02, 0.03],
        radius: 5e-3,
    };
    let Heating::Several(zones) = &joint.source else {
        panic!("{:?}", joint.source);
    };
    let HeatedZone { zone, heat } = zones[0];
    assert_eq!((zone, heat), (disc, 12.0));
    let fields: Vec<String> = joint
        .needs_elastic()
        .into_iter()
        .map(|each| each.0)
        .collect();
    assert_eq!(fields, ["plate.box.heated"]);
    // One of them alone is the source of before, with its heat.
    let one = read(&with(
        r#"heated = { diameter = "10 mm", heat = "12 W" }"#,
        "",
    ));
    assert_eq!(one.service.heat, Some(12.0));
    assert!(one.source.alone().is_some() && one.needs_elastic().is_empty());
    // The sum may be stated as well, and a limit of the rise is content with the zones.
    let sets = ["service.heat=20 W", "service.require.rise=5 K"];
    assert_eq!(read_with(&with(TWO, ""), &sets).service.heat, Some(20.0));
    assert!(
        read_with(&with(TWO, ""), &sets[1..])
            .service
            .require
            .is_some()
    );
}

#[test]
fn parts_of_a_sink_stand_side_by_side() {
    let joint = read(&with(
        "",
        r#"cooled = [
            { film = "8 kW/(m²·K)", centre = ["40 mm", "10 mm"], size = ["80 mm", "8 mm"] },
            { edge = ["upper", "left"] },
            { face = "isothermal", diameter = "6 mm" },
        ]"#,
    ));
    let strip = Zone::Rectangle {
        centre: [0.04, 0.01],
        size: [0.08, 8e-3],
    };
    let Cooling::Parts(parts) = &joint.sink else {
        panic!("{:?}", joint.sink);
    };
    assert!(
        matches!(parts[0], CooledPart::Film { zone, coefficient } if zone == strip && near(coefficient, 8000.0))
    );
    // Edges come in one order whatever the file's.
    let edges = [Edge::Left, Edge::Upper].map(CooledPart::Edge);
    assert_eq!(parts[1..3], edges);
    // A zone without a centre lies in the middle of its plate.
    let CooledPart::Held(Zone::Disc { centre, .. }) = parts[3] else {
        panic!("{:?}", parts[3]);
    };
    assert!(at(centre, [0.04, 0.03]));
    let fields: Vec<String> = joint
        .needs_elastic()
        .into_iter()
        .map(|each| each.0)
        .collect();
    assert_eq!(fields, ["plate.panel.cooled"]);
    let all = read(&with("", r#"cooled = { edge = "all" }"#));
    assert!(matches!(&all.sink, Cooling::Parts(parts) if parts.len() == 4));
}

#[test]
fn one_table_means_what_it_meant() {
    let sink = |lower: &str| read(&with("", lower)).sink;
    for lower in [
        r#"cooled = { film = "500 W/(m²·K)" }"#,
        r#"cooled = [{ film = "500 W/(m²·K)" }]"#,
    ] {
        assert_eq!(sink(lower), Sink::Film(500.0).into());
    }
    let held = r#"cooled = { temperature = "30 °C" }"#;
    assert_eq!(sink(held), Sink::IsothermalBack.into());
    let joint = read(&with("", held));
    assert!(near(joint.service.cases[0].temperature, 303.15));
}

#[test]
fn a_radiating_sink_is_as_warm_as_its_heat_asks() {
    let lower = r#"cooled = { radiation = { emissivity = 0.8, temperature = "200 K" } }"#;
    let joint = read_with(&with("", lower), &["service.heat=1 W"]);
    // By hand: T⁴ = 200⁴ + 1/(0.8 · 5.670374419e-8 · 0.0048) = 1.6e9 + 4.5925e9, T = 280.5 K.
    let found = joint.service.cases[0].temperature;
    assert!((found - 280.52).abs() < 0.05, "{found}");
    let told = |field: &str| joint.assumptions.iter().any(|each| each.field == field);
    assert!(told("service.temperature.sink") && told("plate.panel.cooled.radiation"));
    assert!(joint.sink.radiates());
    // Two cases: both surroundings are told.
    let lower = "cooled = { radiation = 0.8 }";
    let sets = [
        "service.heat=1 W",
        "service.temperature={ hot = \"50 °C\", cold = \"20 °C\" }",
    ];
    let joint = read_with(&with("", lower), &sets);
    let mut told = joint.assumptions.iter();
    let told = told
        .find(|each| each.field == "plate.panel.cooled.radiation.temperature")
        .expect("the surroundings are told");
    assert!(
        told.value.starts_with("hot: ") && told.value.contains(", cold: "),
        "{told:?}"
    );
}

#[test]
fn a_plate_conducts_otherwise_along_than_through() {
    let layers = r#"conductivity = { in_plane = "400 W/(m·K)", through = "5 W/(m·K)" }"#;
    let joint = read(&with(layers, ""));
    let material = &joint.warm().material;
    assert!(near(material.conductivity.value, 400.0) && near(material.through_ratio(), 0.0125));
    assert!(near(joint.cold().material.through_ratio(), 1.0));
    let fields: Vec<String> = joint
        .needs_elastic()
        .into_iter()
        .map(|each| each.0)
        .collect();
    assert_eq!(fields, ["plate.box.conductivity"]);
    // What the plate states is its own at any temperature.
    for temperature in [77.0, 293.0] {
        let found = material.conductivity_at(temperature).expect("stated");
        assert!((found - 400.0).abs() < 1e-9, "{found}");
    }
    // The same by the material.
    let own = read_with(
        &plain(),
        &[
            "plate.box.material.conductivity=400 W/(m·K)",
            "plate.box.material.through=5 W/(m·K)",
        ],
    );
    assert!(near(own.warm().material.through_ratio(), 0.0125));
}

#[test]
fn isolating_washers_lie_under_head_and_nut() {
    let set = "fastener.isolating={ material = \"G-10\", thickness = \"1 mm\" }";
    let joint = read_with(&plain(), &[set]);
    let washers = joint.fasteners[0].isolating.as_ref().expect("washers");
    assert_eq!(washers.count, 2);
    assert!(near(washers.height(), 2e-3));
    let joint = read_with(&plain(), &[set, "fastener.engagement=tapped"]);
    let washers = joint.fasteners[0].isolating.as_ref().expect("washers");
    assert_eq!(washers.count, 1);
    assert!(
        joint
            .assumptions
            .iter()
            .any(|each| each.field == "fastener.isolating.under" && each.value == "head")
    );
}

#[test]
fn overrides_reach_one_of_several_zones() {
    let text = with(TWO, r#"cooled = { film = "500 W/(m²·K)" }"#);
    let sets = [
        "plate.box.heated[2].heat=18 W",
        "plate.panel.cooled.edge=[\"left\", \"right\"]",
    ];
    let joint = read_with(&text, &sets);
    assert!(near(joint.service.heat.expect("the sum"), 30.0));
    // The edge takes the place of the film.
    let edges = [Edge::Left, Edge::Right].map(CooledPart::Edge);
    assert_eq!(joint.sink, Cooling::Parts(edges.to_vec()));
    // All zones at once, one of them at once, and a table that was not there.
    let whole = "plate.box.heated={ diameter = \"10 mm\" }";
    assert!(read_with(&text, &[whole]).source.alone().is_some());
    let one = "plate.box.heated[1]={ diameter = \"10 mm\", heat = \"1 W\" }";
    assert!(near(
        read_with(&text, &[one]).service.heat.expect("the sum"),
        9.0
    ));
    let joint = read_with(&plain(), &["plate.box.heated.diameter=10 mm"]);
    let zone = Zone::Disc {
        centre: [0.04, 0.03],
        radius: 5e-3,
    };
    let isothermal = false;
    assert_eq!(joint.source, Source { zone, isothermal }.into());
    // Which of the two is not said, and there is no third.
    for set in ["plate.box.heated.heat=1 W", "plate.box.heated[3].heat=1 W"] {
        let faults = read_with_files(&text, &[set.to_owned()], &|_| Err(String::new()))
            .expect_err("no such zone");
        assert_eq!(faults.faults[0].1.code, "set/bad-override", "{set}");
    }
}
