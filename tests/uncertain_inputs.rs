//! Stated spreads and distributions, bolts that scatter for themselves, worst cases, losses.

use ringsum::{
    estimate::{Chain, Options, Realisation},
    joint::{self, Bounds, Friction, Joint, Tightening, What},
    numerics::distribution::Shape,
    uncertainty::{self, Moves},
};

const PLATES: &str = r#"
[service]
medium = "vacuum"
[[plate]]
material = "Al 6061-T6"
thickness = "5 mm"
size = ["80 mm", "80 mm"]
finish = { roughness = "Ra 0.8 µm", slope = 0.11 }
[[plate]]
material = "Al 6061-T6"
thickness = "5 mm"
size = ["80 mm", "80 mm"]
finish = { roughness = "Ra 0.8 µm", slope = 0.11 }
"#;

const BOLTS: &str = r#"
[fastener]
thread = "M5"
grade = "8.8"
head = "socket"
preload = "4 kN to 6 kN"
at = [["15 mm", "15 mm"], ["65 mm", "15 mm"], ["15 mm", "65 mm"], ["65 mm", "65 mm"]]
"#;

const NO_LOSS: &str =
    "[losses]\nsettling = \"0 µm\"\nrelaxation = \"0 %\"\ninteraction = \"0 %\"\n";

fn read(parts: &[&str]) -> Joint {
    joint::read(&parts.concat()).expect("the joint is whole")
}

fn near(found: f64, exact: f64, tolerance: f64) {
    assert!(
        (found / exact - 1.0).abs() < tolerance,
        "{found} for {exact}"
    );
}

fn thread(friction: &str) -> Bounds {
    let bolt = format!(
        "[fastener]\nthread = \"M5\"\ngrade = \"8.8\"\nhead = \"socket\"\ntorque = \"5 N·m\"\n\
         at = [\"40 mm\", \"40 mm\"]\nfriction = {{ thread = {friction} }}\n"
    );
    let joint = read(&[PLATES, &bolt]);
    match &joint.fasteners[0].tightening {
        Tightening::Torque(torque) => match torque.friction {
            Friction::Coefficients { thread, .. } => thread,
            Friction::NutFactor(_) => panic!("coefficients are stated"),
        },
        Tightening::Preload(_) => panic!("a torque is stated"),
    }
}

/// One grammar for a number: the ends of every form by hand.
#[test]
fn a_spread_is_stated_in_one_grammar() {
    for (text, ends, shape) in [
        ("\"0.12 ± 10 %\"", [0.108, 0.12, 0.132], Shape::Uniform),
        ("\"0.12 +/- 0.02\"", [0.10, 0.12, 0.14], Shape::Uniform),
        ("\"0.08 to 0.16\"", [0.08, 0.12, 0.16], Shape::Uniform),
        ("[0.08, 0.16]", [0.08, 0.12, 0.16], Shape::Uniform),
        (
            "{ low = 0.1, nominal = 0.11, high = 0.14, distribution = \"triangular\" }",
            [0.1, 0.11, 0.14],
            Shape::Triangular,
        ),
        // Three standard deviations of 5 %.
        (
            "{ nominal = 0.12, sigma = \"5 %\" }",
            [0.102, 0.12, 0.138],
            Shape::Normal,
        ),
        (
            "{ nominal = 0.12, sigma = 0.01, distribution = \"normal\" }",
            [0.09, 0.12, 0.15],
            Shape::Normal,
        ),
        // A factor of 1.1³ = 1.331 either way.
        (
            "{ nominal = 0.12, sigma = \"10 %\", distribution = \"lognormal\" }",
            [0.12 / 1.331, 0.12, 0.12 * 1.331],
            Shape::LogNormal,
        ),
    ] {
        let found = thread(text);
        assert_eq!(found.shape, shape, "{text}");
        for (found, exact) in [found.low, found.nominal, found.high].iter().zip(ends) {
            near(*found, exact, 1e-12);
        }
    }
}

/// Units and parameters may be left to the other part of a text.
#[test]
fn a_text_states_its_unit_and_parameter_once() {
    let rough = |text: &str| {
        let plates = PLATES.replacen("\"Ra 0.8 µm\"", text, 1);
        read(&[&plates, BOLTS]).plates[0].finish.roughness
    };
    let whole = rough("[\"Ra 0.8 µm\", \"Ra 1.6 µm\"]");
    for text in [
        "\"Ra 0.8 µm to Ra 1.6 µm\"",
        "\"Ra 0.8 µm to 1.6 µm\"",
        "\"Ra 1.2 µm ± 0.4 µm\"",
    ] {
        let found = rough(text);
        near(found.low, whole.low, 1e-12);
        near(found.nominal, whole.nominal, 1e-12);
        near(found.high, whole.high, 1e-12);
    }
    let filler = |text: &str| {
        let filler = format!(
            "[filler]\nmodel = \"layer\"\nconductivity = \"3 W/(m·K)\"\nthickness = {text}\n"
        );
        read(&[PLATES, BOLTS, &filler]).uncertain
    };
    let found = filler("\"0.5 ± 0.1 mm\"");
    assert_eq!(found.len(), 1);
    assert_eq!(found[0].what, What::FillerThickness(0));
    near(found[0].bounds.low, 0.4e-3, 1e-12);
    near(found[0].bounds.high, 0.6e-3, 1e-12);
    assert!(filler("\"0.5 mm\"").is_empty());
}

/// A layer alone between the plates, thickness and conductivity at their ends: R″ = t/k.
#[test]
fn spreads_of_a_filler_move_its_resistance() {
    let filler = "[filler]\nmodel = \"layer\"\nconductivity = \"3 W/(m·K) ± 10 %\"\n\
                  thickness = \"0.5 mm ± 0.1 mm\"\nscatter = \"0 %\"\n";
    let joint = read(&[PLATES, BOLTS, filler, NO_LOSS]);
    let chain = Chain::new(&joint).expect("a chain");
    let contact = |stated: Vec<f64>| {
        let at = Realisation {
            stated,
            ..Realisation::default()
        };
        chain.state(0, &at).expect("a state").path.contact
    };
    let nominal = contact(Vec::new());
    // Conductivity first, as the file's reader lists them.
    near(contact(vec![1.0, 0.0]) / nominal, 1.1, 1e-9);
    near(contact(vec![0.0, 1.0]) / nominal, 0.5 / 0.6, 1e-9);
    let names: Vec<&str> = uncertainty::inputs(&chain)
        .iter()
        .map(|input| input.name)
        .collect();
    assert!(names.contains(&"conductivity of the filler"), "{names:?}");
    assert!(names.contains(&"thickness of the filler"), "{names:?}");
}

/// The worst cases of a measured force law are arithmetic.
///
/// G of one bolt is 0.5 W/K at 5 kN and goes with F^0.9; four bolts between 4 and 6 kN; the
/// measurements scatter by a factor 1.1, three times. Contact alone:
///
/// ```text
/// R_most  = 1.1³/(4 · 0.5 · (4/5)^0.9) = 1.331/1.63611 = 0.81352 K/W
/// R_least = 1/(1.1³ · 4 · 0.5 · (6/5)^0.9) = 1/(2.662 · 1.17834) = 0.31880 K/W
/// ```
#[test]
fn worst_cases_are_those_worked_by_hand() {
    let law = "[measured]\nlaw = { conductance = \"0.5 W/K\", force = \"5 kN\", force_exponent = 0.9 }\n\
               scatter = \"10 %\"\n";
    let joint = read(&[PLATES, BOLTS, law, NO_LOSS]);
    let options = Options {
        draws: 256,
        seed: 1,
    };
    let found = uncertainty::estimate(&joint, &options).expect("a number");
    let case = &found.cases[0];
    let worst = case.worst.expect("every end has a number");
    // Radiation between the faces, below 0.3 W/(m²·K) on 64 cm², adds less than 0.002 W/K to 1.2.
    near(worst.contact[1], 0.813_52, 2e-3);
    near(worst.contact[0], 0.318_80, 2e-3);
    // Worst cases hold the band of the draws.
    for (worst, band) in [
        (worst.contact, case.results.contact),
        (worst.node_to_node, case.results.node_to_node),
        (worst.added_by_joint, case.results.added_by_joint),
        (worst.source_to_sink, case.results.source_to_sink),
    ] {
        let band = band.resistance;
        let (low, high) = (band.low.expect("a low"), band.high.expect("a high"));
        assert!(worst[0] <= low && high <= worst[1], "{worst:?} {band:?}");
    }
}

/// The extreme forces: F = T/(K d) with the tool and the nut factor at their ends, all losses at
/// one end and none at the other.
#[test]
fn extreme_forces_stand_at_the_corners() {
    let bolt = r#"
[fastener]
thread = "M5"
grade = "8.8"
head = "socket"
torque = { value = "5 N·m ± 4 %", running = "0.4 N·m to 0.6 N·m" }
friction = { nut_factor = "0.2 ± 20 %" }
at = ["40 mm", "40 mm"]
"#;
    let losses = "[losses]\nsettling = \"0 µm\"\nrelaxation = \"4 % ± 2 %\"\n\
                  per_decade = \"1 % ± 0.5 %\"\ndecades = 4\n";
    let joint = read(&[PLATES, bolt, losses]);
    let chain = Chain::new(&joint).expect("a chain");
    let service = |corner: f64| {
        let mut at = Realisation::default();
        for input in uncertainty::inputs(&chain) {
            let quantile = match input.moves {
                Moves::MoreForce => corner,
                Moves::LessForce => 1.0 - corner,
                Moves::Other => continue,
            };
            (input.place)(&mut at, quantile);
        }
        chain.state(0, &at).expect("a state").conditions.forces[0]
    };
    // (5·1.04 − 0.4)/(0.16 · 5 mm) (1 − 0.02)(1 − 4·0.005) = 6000 · 0.98 · 0.98 N
    near(service(1.0), 6000.0 * 0.98 * 0.98, 1e-9);
    // (5·0.96 − 0.6)/(0.24 · 5 mm) (1 − 0.06)(1 − 4·0.015) = 3500 · 0.94 · 0.94 N
    near(service(0.0), 3500.0 * 0.94 * 0.94, 1e-9);
    // (5 − 0.5)/(0.2 · 5 mm) (1 − 0.04)(1 − 4·0.01)
    near(service(0.5), 4500.0 * 0.96 * 0.96, 1e-9);
}

/// Bolts tightened again have settling and short-term relaxation behind them.
#[test]
fn retightened_bolts_keep_their_force() {
    let force = |losses: &str| {
        let joint = read(&[PLATES, BOLTS, losses]);
        let chain = Chain::new(&joint).expect("a chain");
        let state = chain.state(0, &Realisation::default()).expect("a state");
        state.conditions.forces[0]
    };
    near(force("[losses]\nretightened = true\n"), 5000.0, 1e-12);
    let in_time = "[losses]\nretightened = true\nlong_term = \"3 %\"\n";
    near(force(in_time), 4850.0, 1e-12);
    assert!(force("[losses]\nsettling = \"guide\"\n") < 4850.0);
}

/// Independent bolts average out: of n forces that scatter alike the sum scatters by 1/√n.
#[test]
fn independent_bolts_average_out() {
    let law =
        "[measured]\nlaw = { conductance = \"0.5 W/K\", force = \"5 kN\" }\nscatter = \"0 %\"\n";
    let width = |bolts: &str| {
        let lot = format!("[uncertainty]\nbolts = \"{bolts}\"\n");
        let joint = read(&[PLATES, BOLTS, law, NO_LOSS, &lot]);
        let options = Options {
            draws: 4096,
            seed: 3,
        };
        let found = uncertainty::estimate(&joint, &options).expect("a number");
        let band = found.cases[0].results.contact.resistance.inverse();
        band.high.expect("a high") - band.low.expect("a low")
    };
    let (lot, own) = (width("one lot"), width("independent"));
    // One lot: 90 % of an even spread of ±1 kN, 4 · 0.1 W/K per kN, 0.72 W/K.
    near(lot, 0.72, 0.01);
    // The sum of four even ones between 0 and 1 has its 5 % quantile x where
    // (x⁴ − 4 (x − 1)⁴)/24 = 0.05 (Irwin–Hall): x = 1.0466. The band is 1 − 2 x/4 = 0.4767 of the
    // whole width against 0.9; 1 % is the noise of 4096 draws.
    near(own / lot, 0.476_7 / 0.9, 0.01);
}
