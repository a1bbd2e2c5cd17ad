//! The compiled plan of the draws beside the chain, and the surfaces beside solutions.

use std::{fs, path::Path};

use ringsum::{
    estimate::{Chain, Choice, Drawn, Fineness, Options, Realisation, Watch},
    joint::{self, Joint},
    numerics::sampling::Sobol,
    uncertainty::{self, Input},
};

const MEMORY: u64 = 1_000_000_000;
/// Rounding of sums in another order, and of the exponentials behind them: the plan evaluates the
/// same laws and the same surfaces as the chain.
const ROUNDING: f64 = 1e-10;

fn demo(name: &str) -> Joint {
    let text = fs::read_to_string(Path::new("joints").join(name)).expect("the demo is there");
    let table = |name: &str| {
        fs::read_to_string(Path::new("joints").join(name)).map_err(|fault| fault.to_string())
    };
    joint::read_with_files(&text, &[], &table).expect("the demo is good")
}

fn names() -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir("joints")
        .expect("the demos are there")
        .filter_map(|entry| entry.ok()?.file_name().into_string().ok())
        .filter(|name| {
            Path::new(name)
                .extension()
                .is_some_and(|ending| ending == "toml")
        })
        .collect();
    names.sort();
    names
}

fn round(sets: &[&str]) -> Joint {
    let text = fs::read_to_string("tests/data/joints/round_single.toml")
        .expect("the file is there")
        .replace(
            "preload = \"2 kN\"",
            "torque = { value = \"3 N·m\", tolerance = \"10 %\" }\nfriction = { class = \"B\" }",
        );
    let sets: Vec<String> = sets.iter().map(|set| (*set).to_owned()).collect();
    joint::read_with(&text, &sets).expect("a good joint")
}

fn solved(joint: &Joint) -> Chain<'_> {
    let choice = Choice::elastic(Fineness::Fast, MEMORY);
    Chain::of(joint, choice, &Watch::none()).expect("a field")
}

fn places(inputs: &[Input], count: u32, seed: u64) -> Vec<Realisation> {
    let sobol = Sobol::new(inputs.len(), seed);
    let mut walk = sobol.walk(0);
    let mut point = vec![0.0; inputs.len()];
    (0..count)
        .map(|_| {
            walk.next_into(&mut point);
            let mut at = Realisation::default();
            for (input, u) in inputs.iter().zip(&point) {
                (input.place)(&mut at, *u);
            }
            at
        })
        .collect()
}

/// Holds the plan of every case against the chain at some draws.
fn plan_follows(chain: &Chain, count: u32, what: &str) {
    let inputs = uncertainty::inputs(chain);
    for case in 0..chain.joint().service.cases.len() {
        let plan = chain.draw_plan(case).expect("a plan");
        let mut workspace = plan.workspace();
        for at in places(&inputs, count, 17) {
            let path = chain.state(case, &at).expect("a state").path;
            let found = plan.drawn(&at, &mut workspace).expect("a draw");
            let wanted = Drawn {
                contact: path.contact.recip(),
                node_to_node: path.node_to_node,
                added_by_joint: path.added_by_joint,
                source_to_sink: path.source_to_sink,
                perfect_contact: path.perfect_contact,
                hottest: path.hottest,
                interface_drop: path.interface_drop,
                coolant_drop: path.coolant_drop.unwrap_or(0.0),
                heat: 1.0,
            };
            // Means of plates may lie near nothing: their scale is that of source to sink.
            let pairs = found.all().into_iter().zip(wanted.all());
            for (reading, (found, wanted)) in pairs.enumerate() {
                let scale = if reading == 0 {
                    wanted
                } else {
                    wanted.abs().max(path.source_to_sink)
                };
                assert!(
                    found.total_cmp(&wanted).is_eq() || ((found - wanted) / scale).abs() < ROUNDING,
                    "{what}, case {case}, reading {reading}: {found} for {wanted}, {at:?}"
                );
            }
        }
    }
}

#[test]
fn plan_gives_what_the_chain_gives_on_the_cone_of_every_demo() {
    let mut seen = 0;
    for name in names() {
        let joint = demo(&name);
        if joint.needs_elastic().is_empty() {
            plan_follows(&Chain::new(&joint).expect("a chain"), 24, &name);
            seen += 1;
        }
    }
    assert!(seen >= 10, "{seen}");
}

// Every kind of face, medium, filler and stack that the surfaces know; the demos whose surfaces take
// long are left to `plan_gives_what_the_chain_gives_on_every_solved_demo`.
#[test]
fn plan_gives_what_the_chain_gives_on_solved_fields() {
    for sets in [
        &[][..],
        &["service.medium=air"][..],
        &["contact.law=plastic"][..],
    ] {
        let joint = round(sets);
        plan_follows(&solved(&joint), 200, &format!("round {sets:?}"));
    }
    let joint = demo("led_board.toml");
    plan_follows(&solved(&joint), 200, "led_board.toml");
}

// Minutes: `cargo test --profile quick --test validation_draws -- --ignored`.
#[test]
#[ignore = "solves the surfaces of every demo"]
fn plan_gives_what_the_chain_gives_on_every_solved_demo() {
    for name in names() {
        let joint = demo(&name);
        plan_follows(&solved(&joint), 100, &name);
    }
}

// The surfaces tell their own error at four probes inside the range of force; draws spread farther in
// the other directions, so that three times that error is allowed, and 1 % at least.
#[test]
fn surfaces_hold_at_draws_that_are_solved() {
    for sets in [&[][..], &["service.medium=air"][..]] {
        let joint = round(sets);
        let chain = solved(&joint);
        let options = Options { draws: 24, seed: 5 };
        let found = uncertainty::verification(&chain, 0, &options)
            .expect("solutions")
            .expect("a solved field has surfaces");
        let told = chain.draw_error(0).expect("the surfaces tell their error");
        assert_eq!(found.draws, 24);
        assert!(found.mean > 0.0 && found.mean <= found.largest, "{found:?}");
        assert!(
            found.largest < (3.0 * told).max(0.01),
            "{sets:?}: {found:?}, told {told}"
        );
    }
    let cone = round(&[]);
    let cone = Chain::new(&cone).expect("a chain");
    let options = Options { draws: 4, seed: 5 };
    assert_eq!(uncertainty::verification(&cone, 0, &options), Ok(None));
}
