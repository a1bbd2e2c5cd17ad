//! Stacks of three plates: the composite wall, mirrored stacks, forces through every interface, a
//! shim of next to no thickness, and what the plate between adds to the spread.

#[path = "shared/joints.rs"]
mod joints;

use joints::{fast, read};
use ringsum::{
    estimate::{self, CaseResult, Options, Realisation},
    joint::Joint,
    uncertainty,
};

/// Nominal results only.
const NOMINAL: Options = Options { draws: 0, seed: 1 };

fn case(joint: &Joint) -> CaseResult {
    let found = estimate::nominal(&fast(joint), &NOMINAL).expect("a stack has a number");
    found.cases[0].clone()
}

/// One plate of 40 by 30 mm: name, conductivity in W/(m K), thickness in mm, further lines.
type Sheet<'a> = (&'a str, f64, f64, &'a str);

/// The parts of a file of such plates, warm first; two M4 of known force through all of them.
fn file(sheets: &[Sheet], bolt: &str, rest: &str) -> String {
    let plates: Vec<String> = sheets
        .iter()
        .map(|(name, conductivity, thickness, lines)| {
            format!(
                "[[plate]]\nname = \"{name}\"\n\
                 material = {{ like = \"Al 6061-T6\", conductivity = \"{conductivity} W/(m·K)\" }}\n\
                 thickness = \"{thickness} mm\"\nsize = [\"40 mm\", \"30 mm\"]\n\
                 finish = {{ roughness = \"Rq 1 µm\", slope = 0.1, flatness = \"0 mm\" }}\n{lines}\n"
            )
        })
        .collect();
    let plates = plates.concat();
    format!(
        "[service]\nmedium = \"vacuum\"\n{plates}[fastener]\nthread = \"M4\"\ngrade = \"8.8\"\n\
         bearing = \"8 mm\"\nhole = \"4.5 mm\"\npreload = \"3 kN\"\nshank_path = false\n{bolt}\
         at = [[\"8 mm\", \"15 mm\"], [\"32 mm\", \"15 mm\"]]\n{rest}"
    )
}

/// A layer of one area resistance whatever the pressure, so soft that it is pressed all over; no
/// scatter unless stated.
fn layer(between: [&str; 2], resistance: f64, scatter: &str) -> String {
    // All of it lies in the boundaries: the layer thins under its pressure and conducts too well to matter.
    format!(
        "[[filler]]\nname = \"test layer\"\nmodel = \"layer\"\nthickness = \"0.1 mm\"\n\
         conductivity = \"4000 W/(m·K)\"\nboundary = \"{resistance} m²·K/W\"\nmodulus = \"0.5 MPa\"\nscatter = \"{scatter}\"\n\
         between = [\"{}\", \"{}\"]\n",
        between[0], between[1]
    )
}

const SHEETS: [Sheet; 3] = [
    ("base", 390.0, 5.0, ""),
    ("shim", 16.0, 3.0, ""),
    ("panel", 160.0, 4.0, ""),
];
/// Area resistance of the two layers, m² K/W.
const LAYERS: [f64; 2] = [2e-5, 5e-5];
/// Area of the plates without the two holes, m².
const AREA: f64 = 1.2e-3 - 2.0 * std::f64::consts::PI * 2.25e-3 * 2.25e-3;

/// Plates and layers in series, K/W.
fn wall(sheets: &[Sheet], layers: &[f64]) -> f64 {
    let plates: f64 = sheets.iter().map(|sheet| sheet.2 * 1e-3 / sheet.1).sum();
    (plates + layers.iter().sum::<f64>()) / AREA
}

fn walled(scatter: [&str; 2]) -> String {
    let first = layer(["base", "shim"], LAYERS[0], scatter[0]);
    let second = layer(["panel", "shim"], LAYERS[1], scatter[1]);
    file(&SHEETS, "", &(first + &second))
}

/// R = Σ t/(k A) + Σ R″/A, the composite wall with contact resistances (Incropera, section 3.1,
/// from memory): flux goes straight through where nothing spreads it.
#[test]
fn even_layers_make_a_composite_wall() {
    let joint = read(&walled(["0 %", "0 %"]));
    let case = case(&joint);
    let near = |found: f64, exact: f64, what: &str| {
        // Cells that a hole cuts carry a share of it, and bend the flux a little.
        assert!(
            (found / exact - 1.0).abs() < 2e-3,
            "{what}: {found} {exact}"
        );
    };
    let results = &case.results;
    let whole = results.source_to_sink.resistance.nominal;
    near(whole, wall(&SHEETS, &LAYERS), "source to sink");
    near(
        results.perfect_contact.resistance.nominal,
        wall(&SHEETS, &[]),
        "perfect contact",
    );
    let series: f64 = LAYERS.iter().sum::<f64>() / AREA;
    near(results.contact.resistance.nominal, series, "contact only");
    near(results.added_by_joint.resistance.nominal, series, "added");
    // Plate means lie half a plate inside the first and the last.
    let halves = 0.5 * (5e-3 / 390.0 + 4e-3 / 160.0) / AREA;
    let node = results.node_to_node.resistance.nominal;
    near(node, wall(&SHEETS, &LAYERS) - halves, "node to node");
    for (interface, layer) in case.interfaces.iter().zip(LAYERS) {
        near(interface.drop, layer / AREA, "drop");
        near(interface.contact, AREA / layer, "conductance");
    }
    assert_eq!(case.interfaces[1].plates, ["shim", "panel"]);
}

/// Equilibrium: no force enters the plate between but through its faces.
#[test]
fn every_interface_carries_the_clamp_force() {
    let sheets = [
        ("base", 160.0, 4.0, ""),
        ("shim", 160.0, 4.0, ""),
        ("panel", 160.0, 4.0, ""),
    ];
    let case = case(&read(&file(&sheets, "", "")));
    for interface in &case.interfaces {
        // Two bolts of 3 kN; the last linear solution leaves 1e-7 of its load.
        let off = interface.force / 6000.0 - 1.0;
        assert!(off.abs() < 1e-6, "{:?}: {off:e}", interface.plates);
    }
}

/// What is turned upside down conducts the same: between two isothermal faces the path has no
/// direction.
#[test]
fn a_stack_upside_down_is_the_same_stack() {
    let heated = "heated = { face = \"isothermal\" }";
    let foil = |between: [&str; 2]| layer(between, 3e-5, "0 %");
    let upright = [
        ("base", 160.0, 5.0, heated),
        (
            "shim",
            30.0,
            2.0,
            "finish_below = { roughness = \"Rq 2 µm\", slope = 0.15, flatness = \"0 mm\" }",
        ),
        ("panel", 160.0, 8.0, ""),
        ("back", 160.0, 3.0, ""),
    ];
    let turned = [
        ("back", 160.0, 3.0, heated),
        ("panel", 160.0, 8.0, ""),
        (
            "shim",
            30.0,
            2.0,
            "finish_below = { roughness = \"Rq 1 µm\", slope = 0.1, flatness = \"0 mm\" }",
        ),
        ("base", 160.0, 5.0, ""),
    ];
    let turned = file(&turned, "from = \"base\"\n", &foil(["panel", "back"])).replacen(
        "name = \"shim\"\nmaterial = { like = \"Al 6061-T6\", conductivity = \"30 W/(m·K)\" }\nthickness = \"2 mm\"\n\
         size = [\"40 mm\", \"30 mm\"]\nfinish = { roughness = \"Rq 1 µm\", slope = 0.1,",
        "name = \"shim\"\nmaterial = { like = \"Al 6061-T6\", conductivity = \"30 W/(m·K)\" }\nthickness = \"2 mm\"\n\
         size = [\"40 mm\", \"30 mm\"]\nfinish = { roughness = \"Rq 2 µm\", slope = 0.15,",
        1,
    );
    for thread in ["", "engagement = { kind = \"tapped\" }\n"] {
        let upright = file(&upright, thread, &foil(["panel", "back"]));
        let turned = turned.replacen("from = ", &format!("{thread}from = "), 1);
        let [one, other] = [upright, turned].map(|text| case(&read(&text)));
        // The same equations in another order; what the linear solutions leave of their loads, 1e-7, moves
        // the edge of contact a little.
        let near = |one: f64, other: f64, what: &str| {
            assert!(
                (one / other - 1.0).abs() < 1e-4,
                "{thread}{what}: {one} {other}"
            );
        };
        let whole = |case: &CaseResult| case.results.source_to_sink.resistance.nominal;
        near(whole(&one), whole(&other), "source to sink");
        let added = |case: &CaseResult| case.results.added_by_joint.resistance.nominal;
        near(added(&one), added(&other), "added by the joint");
        assert_eq!(one.interfaces.len(), 3);
        for (one, other) in one.interfaces.iter().zip(other.interfaces.iter().rev()) {
            near(one.contact, other.contact, "conductance");
            near(one.force, other.force, "force");
            near(one.drop, other.drop, "drop");
            near(one.contact_area, other.contact_area, "area");
            let [gap, turned] = [one, other].map(|each| each.gap_max.unwrap_or(f64::NAN));
            // A tenth of a micrometre is left of displacements of micrometres.
            assert!(
                (gap - turned).abs() <= 1e-3 * turned,
                "{thread}: {gap} {turned}"
            );
        }
        // The faces differ, so that a mix-up shows.
        assert!((one.interfaces[0].contact / one.interfaces[1].contact - 1.0).abs() > 0.1);
    }
}

/// A sheet of next to no stiffness passes the pressure on as it is.
#[test]
fn a_thin_shim_presses_as_if_it_were_not_there() {
    let pair = [("base", 160.0, 4.0, ""), ("panel", 160.0, 4.0, "")];
    let stack = [pair[0], ("shim", 160.0, 0.1, ""), pair[1]];
    let [pair, stack] = [file(&pair, "", ""), file(&stack, "", "")].map(|text| case(&read(&text)));
    let alone = &pair.interfaces[0];
    for interface in &stack.interfaces {
        // The shim is 1/40 of a plate thick, and the pressure spreads as far more: 2 % of the radius
        // in either direction of the area.
        let near = |found: f64, alone: f64, what: &str| {
            let off = found / alone - 1.0;
            assert!(off.abs() < 0.04, "{what}: {off:+.4}");
        };
        near(interface.contact, alone.contact, "conductance");
        near(interface.peak, alone.peak, "peak");
        near(interface.contact_area, alone.contact_area, "area");
    }
    let off = stack.pressure.radius_95 / pair.pressure.radius_95 - 1.0;
    assert!(off.abs() < 0.02, "{off:+.4}");
    let contact = |case: &CaseResult| case.results.contact.resistance.nominal;
    let doubled = contact(&stack) / contact(&pair);
    assert!((doubled / 2.0 - 1.0).abs() < 0.02, "{doubled}");
}

/// Conductivity of the plate between from 14 to 18 W/(m K), even: the quantiles of the composite wall
/// follow by hand.
#[test]
fn the_plate_between_is_in_the_spread() {
    let text = walled(["0 %", "0 %"]).replace(
        "conductivity = \"16 W/(m·K)\"",
        "conductivity = [\"14 W/(m·K)\", \"18 W/(m·K)\"]",
    );
    let joint = read(&text);
    let options = Options {
        draws: 256,
        seed: 1,
    };
    let found = uncertainty::along(&fast(&joint), &options).expect("draws");
    let case = &found.cases[0];
    let first = &case.drivers[0];
    assert_eq!(first.input, "conductivity of the plates between");
    assert!(first.share > 0.9, "{first:?}");
    let by_hand = |conductivity: f64| {
        let mut sheets = SHEETS;
        sheets[1].1 = conductivity;
        wall(&sheets, &LAYERS)
    };
    let told = case.results.source_to_sink.resistance;
    // 5 % of the plates conduct better than 17.8; 256 draws and what the other plates add leave 1 %.
    for (told, exact) in [(told.low, by_hand(17.8)), (told.high, by_hand(14.2))] {
        let off = told.expect("a band") / exact - 1.0;
        assert!(off.abs() < 0.01, "{off:+.4}");
    }
}

/// Scatter of one layer moves the whole by as much as that layer has in it.
#[test]
fn scatter_of_one_interface_moves_its_own_share() {
    for (scatter, own) in [(["20 %", "0 %"], 0), (["0 %", "20 %"], 1)] {
        let joint = read(&walled(scatter));
        let chain = fast(&joint);
        let at = Realisation {
            // One standard deviation: 2 Φ(1) − 1.
            filler: 0.682_689_492_137_085_9,
            ..Realisation::default()
        };
        let moved = chain.state(0, &at).expect("a state").path.source_to_sink;
        let nominal = chain.state(0, &Realisation::default()).expect("a state");
        let exact = 0.2 * LAYERS[own] / AREA;
        let off = (moved - nominal.path.source_to_sink) / exact - 1.0;
        // One number stands for both interfaces in the logarithm: exact to first order, 20 % off in
        // one of two leaves about w (1 − w)/2 · 0.2² of the joint's part, 0.04 of the change.
        assert!(off.abs() < 0.08, "{scatter:?}: {off:+.4}");
    }
}
