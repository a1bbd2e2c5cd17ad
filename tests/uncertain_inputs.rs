//! Stated spreads and distributions, bolts that scatter for themselves, worst cases, losses.

use ringsum::{
    estimate::{Chain, Options, Realisation},
    joint::{self, Bounds, Cooling, Friction, Joint, Sink, Tightening, What},
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

/// Everything that a file states with a spread is an input with a remedy, in the drivers, the worst case
/// and the band.
#[test]
fn stated_spreads_of_plates_sink_and_gas_are_inputs() {
    let plates = PLATES
        .replace(
            "\"vacuum\"",
            "\"helium\"\npressure = \"2 kPa ± 50 %\"\nheat = \"20 W\"",
        )
        .replacen("thickness = \"5 mm\"", "thickness = \"5 mm ± 0.5 mm\"", 1)
        + "cooled = { film = \"500 W/(m²·K) ± 30 %\" }\n";
    let joint = read(&[&plates, BOLTS, NO_LOSS]);
    let chain = Chain::new(&joint).expect("a chain");
    let options = uncertainty::RankingOptions {
        target: uncertainty::Target::SourceToSink,
        draws: Options {
            draws: 256,
            seed: 1,
        },
    };
    let ranking = uncertainty::ranking(&chain, &options).expect("a ranking");
    for (name, says) in [
        ("thickness of the warm plate", "now 4.5 to 5.5 mm"),
        ("film of the sink", "now 350 to 650 W/(m²·K)"),
        ("pressure of the gas", "now 1 to 3 kPa"),
    ] {
        let found = ranking.inputs.iter().find(|input| input.input == name);
        let found = found.unwrap_or_else(|| panic!("{name} is missing"));
        assert!(found.remedy.contains(says), "{}", found.remedy);
        assert!(
            (found.alone[0] / found.alone[1] - 1.0).abs() > 1e-6,
            "{name} moves nothing: {found:?}"
        );
    }
    let found = uncertainty::along(&chain, &options.draws).expect("a number");
    let case = &found.cases[0];
    // Told where all of them are moved at once, nearly to their ends: pressure and faces act on each other.
    assert!(
        case.draw_error.is_some_and(|error| error < 0.03),
        "{:?}",
        case.draw_error
    );
    let names: Vec<&str> = case.drivers.iter().map(|driver| driver.input).collect();
    assert!(names.contains(&"film of the sink"), "{names:?}");
    // A thin plate spreads worse: the worst case with the spread is beyond that without.
    let without = plates
        .replace(" ± 0.5 mm", "")
        .replace(" ± 30 %", "")
        .replace(" ± 50 %", "");
    let joint = read(&[&without, BOLTS, NO_LOSS]);
    let known = uncertainty::estimate(&joint, &options.draws).expect("a number");
    let worst = |case: &ringsum::estimate::CaseResult| case.worst.expect("ends").source_to_sink;
    let (wide, narrow) = (worst(case), worst(&known.cases[0]));
    assert!(
        wide[0] < narrow[0] && wide[1] > narrow[1],
        "{wide:?} {narrow:?}"
    );
}

/// The drop from the sink surface to the coolant is Q/(h A): of 20 W over 64 cm², less four holes of
/// 5.5 mm, of 500 W/(m²·K) ± 30 %; 5 % and 95 % of an even spread lie at ± 27 %.
#[test]
fn film_moves_the_drop_to_the_coolant_as_its_reciprocal() {
    let plates = PLATES.replace("\"vacuum\"", "\"vacuum\"\nheat = \"20 W\"")
        + "cooled = { film = \"500 W/(m²·K) ± 30 %\" }\n";
    let joint = read(&[&plates, BOLTS]);
    let options = Options { draws: 64, seed: 1 };
    let found = uncertainty::estimate(&joint, &options).expect("a number");
    let rise = found.cases[0].rise.expect("a heat");
    let area = 64e-4 - std::f64::consts::PI * 5.5e-3_f64.powi(2);
    near(
        rise.coolant_drop.expect("a film"),
        20.0 / (500.0 * area),
        1e-9,
    );
    let [low, high] = rise.coolant_drop_ends.expect("a spread");
    near(low, 20.0 / (635.0 * area), 1e-9);
    near(high, 20.0 / (365.0 * area), 1e-9);
}

/// What the cone cannot move is refused there and not left out.
#[test]
fn spreads_of_flatness_ask_for_a_solved_field() {
    for (from, to, field) in [
        (
            "slope = 0.11 }",
            "slope = 0.11, flatness = \"10 µm to 30 µm\" }",
            "finish.flatness",
        ),
        (
            "finish = {",
            "bow = { kind = \"convex\", height = \"20 µm ± 5 µm\" }\nfinish = {",
            "bow.height",
        ),
    ] {
        let joint = read(&[&PLATES.replacen(from, to, 1), BOLTS]);
        let refused = Chain::new(&joint).expect_err("the cone takes no such spread");
        let told = refused.to_string();
        assert!(told.contains(field) && told.contains("spread"), "{told}");
    }
}

/// Faults that a spread can have and a single value cannot, each at its place.
#[test]
fn ends_of_a_spread_are_held_as_a_value_is() {
    let codes = |plates: &str, bolts: &str| -> Vec<&'static str> {
        let refused = joint::read(&[plates, bolts].concat()).expect_err("a fault");
        refused.iter().map(|fault| fault.code).collect()
    };
    let thick =
        |value: &str| PLATES.replace("thickness = \"5 mm\"", &format!("thickness = {value}"));
    // Thicker than is taken at one end only, in both plates.
    assert_eq!(
        codes(&thick("\"0.4 m to 0.6 m\""), BOLTS),
        ["geometry/size-limit"; 2]
    );
    // A thread of 5 mm in a plate that may be 4.8 mm thick.
    let tapped = BOLTS.replace(
        "preload",
        "engagement = { kind = \"tapped\", length = \"5 mm\" }\npreload",
    );
    assert_eq!(codes(&thick("\"5 mm ± 0.2 mm\""), &tapped), ["value/range"]);
    let cooled = "cooled = [{ film = \"5 W/(m²·K) ± 1 W/(m²·K)\" }, { radiation = 0.8 }]\n";
    let heated = PLATES.replace("\"vacuum\"", "\"vacuum\"\nheat = \"2 W\"");
    assert_eq!(codes(&[&heated, cooled].concat(), BOLTS), ["file/conflict"]);
}

/// Who states a value with its spread has the joint of the file that states the value.
#[test]
fn a_remade_joint_is_the_one_of_its_file() {
    let plates = PLATES
        .replacen("thickness = \"5 mm\"", "thickness = \"5 mm ± 1 mm\"", 1)
        .replace(
            "finish = {",
            "bow = { kind = \"convex\", height = \"20 µm ± 5 µm\" }\nfinish = {",
        )
        + "cooled = { film = \"500 W/(m²·K) ± 30 %\" }\n";
    let tapped = BOLTS.replace(
        "preload",
        "from = \"lower\"\nengagement = { kind = \"tapped\" }\npreload",
    );
    let joint = read(&[&plates, &tapped]);
    let numbers = joint.remaking();
    assert_eq!(numbers.len(), 4, "{:?}", joint.uncertain);
    let stated = plates
        .replace("5 mm ± 1 mm", "4.2 mm")
        .replacen("20 µm ± 5 µm", "17 µm", 1)
        .replacen("20 µm ± 5 µm", "21 µm", 1)
        .replace("500 W/(m²·K) ± 30 %", "420 W/(m²·K)");
    let exact = read(&[&stated, &tapped]);
    let bow = |plate: usize| exact.plates[plate].bow.expect("a bow").abs();
    let Cooling::Whole(Sink::Film(film)) = exact.sink else {
        panic!("a film on the whole back is stated")
    };
    let values = [exact.plates[0].thickness, bow(0), bow(1), film];
    let values: Vec<(usize, f64)> = numbers.into_iter().zip(values).collect();
    let remade = joint.remade(&values);
    assert_eq!(remade.fasteners, exact.fasteners);
    assert_eq!(remade.sink, exact.sink);
    assert_eq!(remade.plates, exact.plates);
}

/// In gas the worst case stands where every combination of ends says it stands.
///
/// Each of the inputs at its ends or at nominal, the force at its corners. On the cone more force is always
/// less resistance, so that no force between the corners is worse.
#[test]
fn the_worst_case_in_gas_is_the_worst_of_every_combination() {
    let plates = PLATES.replace("\"vacuum\"", "\"helium\"");
    let joint = read(&[&plates, BOLTS, NO_LOSS]);
    let chain = Chain::new(&joint).expect("a chain");
    let options = Options { draws: 64, seed: 1 };
    let found = uncertainty::along(&chain, &options).expect("a number");
    let case = &found.cases[0];
    let worst = case.worst.expect("every end has a number");
    let inputs: Vec<_> = uncertainty::inputs(&chain)
        .into_iter()
        .filter(|input| input.name != uncertainty::NUMERICAL)
        .collect();
    let plan = chain.draw_plan(0).expect("a plan");
    let mut workspace = plan.workspace();
    let mut ends = [[f64::INFINITY, f64::NEG_INFINITY]; 4];
    let states = 3_usize.pow(u32::try_from(inputs.len()).expect("few"));
    for state in 0..states {
        let mut at = Realisation::default();
        let mut rest = state;
        for input in &inputs {
            match rest % 3 {
                0 => (input.place)(&mut at, input.ends[0]),
                1 => (input.place)(&mut at, input.ends[1]),
                _ => {}
            }
            rest /= 3;
        }
        let drawn = plan.drawn(&at, &mut workspace).expect("a number");
        let answers = [
            drawn.contact,
            drawn.node_to_node,
            drawn.added_by_joint,
            drawn.source_to_sink,
        ];
        for ([low, high], answer) in ends.iter_mut().zip(answers) {
            *low = low.min(answer);
            *high = high.max(answer);
        }
    }
    assert!(states >= 3_usize.pow(7), "{states}");
    let told = [
        worst.contact,
        worst.node_to_node,
        worst.added_by_joint,
        worst.source_to_sink,
    ];
    // The search holds the numerical error as well, which moves all but the ring sum by its own part.
    for (which, (told, ends)) in told.into_iter().zip(ends).enumerate() {
        let error = if which == 0 {
            0.0
        } else {
            case.numerical_error
        };
        near(told[0], ends[0] * (1.0 - error), 1e-9);
        near(told[1], ends[1] * (1.0 + error), 1e-9);
    }
}
