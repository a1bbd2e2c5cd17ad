//! Values that make another joint: what the draws read beside the joint whose file states the value.

use std::fs;

use ringsum::{
    estimate::{Chain, Choice, Fineness, Realisation, State, Watch},
    joint::{self, Joint},
};

const MEMORY: u64 = 1_000_000_000;
/// Nominal, both ends, and two places between that no node stands on (drawn once, from a table of
/// random digits).
const PLACES: [f64; 5] = [0.0, -1.0, 1.0, -0.37, 0.61];

fn file(name: &str) -> String {
    fs::read_to_string(format!("tests/data/joints/{name}.toml")).expect("the file is there")
}

fn read(text: &str, sets: &[String]) -> Joint {
    joint::read_with(text, sets).expect("a good joint")
}

fn chain(joint: &Joint, choice: Choice) -> Chain<'_> {
    Chain::of(joint, choice, &Watch::none()).expect("a field")
}

fn solved() -> Choice {
    Choice::elastic(Fineness::Fast, MEMORY)
}

/// Resistances that a user reads, K/W.
fn resistances(state: &State) -> [f64; 5] {
    let path = &state.path;
    [
        path.contact.recip(),
        path.node_to_node,
        path.added_by_joint,
        path.source_to_sink,
        path.hottest,
    ]
}

/// A spread in a file, and what holds the draws against it.
struct Case<'a> {
    name: &'a str,
    /// Other settings, of the joint with and without the spread alike.
    sets: &'a [&'a str],
    path: &'a str,
    spread: &'a str,
    /// Writes a value of SI as the file states it.
    write: &'a dyn Fn(f64) -> String,
    choice: Choice,
    /// Largest difference, relative to the value or, for those that may lie near nothing, to source to
    /// sink.
    tolerance: f64,
}

impl Case<'_> {
    fn sets(&self, value: &str) -> Vec<String> {
        let mut sets: Vec<String> = self.sets.iter().map(|set| (*set).to_owned()).collect();
        sets.push(format!("{}={value}", self.path));
        sets
    }

    /// Holds the chain at places of the spread against the chain of the joint that states the value
    /// there.
    fn holds(&self) {
        let text = file(self.name);
        let joint = read(&text, &self.sets(self.spread));
        assert_eq!(joint.uncertain.len(), 1, "{}", self.path);
        let bounds = joint.uncertain[0].bounds;
        let drawn = chain(&joint, self.choice);
        drawn.expect_draws(0).expect("draws");
        let mut moved: f64 = 0.0;
        let mut worst = [0.0_f64; 5];
        for place in PLACES {
            let at = Realisation {
                stated: vec![place],
                ..Realisation::default()
            };
            let told = resistances(&drawn.state(0, &at).expect("a state"));
            let value = (self.write)(bounds.at(place));
            let other = read(&text, &self.sets(&value));
            let other = chain(&other, self.choice);
            let exact = other.state(0, &Realisation::default()).expect("a state");
            let exact = resistances(&exact);
            // Means of plates may lie near nothing: their scale is that of source to sink.
            let whole = exact[3];
            for (reading, (told, exact)) in told.iter().zip(exact).enumerate() {
                let scale = if reading == 1 {
                    whole.max(exact.abs())
                } else {
                    exact
                };
                let off = ((told - exact) / scale).abs();
                worst[reading] = worst[reading].max(off);
                assert!(
                    off < self.tolerance,
                    "{} = {value}, reading {reading}: {told} for {exact}",
                    self.path
                );
            }
            let nominal = drawn.state(0, &Realisation::default()).expect("a state");
            moved = moved.max((exact[3] / nominal.path.source_to_sink - 1.0).abs());
        }
        println!(
            "{} {}: moves {moved:.4}, off {worst:.5?}, told {:?}",
            self.name,
            self.path,
            drawn.draw_error(0)
        );
    }
}

fn millimetres(value: f64) -> String {
    format!("\"{} mm\"", value * 1e3)
}

fn micrometres(value: f64) -> String {
    format!("\"{} µm\"", value * 1e6)
}

fn film(value: f64) -> String {
    format!("\"{value} W/(m²·K)\"")
}

#[test]
fn thickness_and_film_on_the_cone_are_those_of_the_file() {
    for (path, spread, write) in [
        (
            "plate.upper.thickness",
            "\"5 mm ± 0.5 mm\"",
            &millimetres as &dyn Fn(f64) -> String,
        ),
        ("plate.lower.thickness", "\"4 mm to 7 mm\"", &millimetres),
        ("plate.lower.cooled.film", "\"2000 W/(m²·K) ± 30 %\"", &film),
        (
            "plate.lower.cooled.film",
            "\"100 W/(m²·K) to 5000 W/(m²·K)\"",
            &film,
        ),
    ] {
        for sets in [&[][..], &["service.medium=air"][..]] {
            Case {
                name: "case_i",
                sets,
                path,
                spread,
                write,
                choice: Choice::Cone,
                tolerance: 0.01,
            }
            .holds();
        }
    }
}

#[test]
fn thickness_and_film_on_solved_fields_are_those_of_the_file() {
    for (name, path, spread, write, tolerance) in [
        (
            "case_i",
            "plate.upper.thickness",
            "\"5 mm ± 0.5 mm\"",
            &millimetres as &dyn Fn(f64) -> String,
            0.01,
        ),
        (
            "case_i",
            "plate.lower.cooled.film",
            "\"2000 W/(m²·K) ± 30 %\"",
            &film,
            0.01,
        ),
        (
            "round_single",
            "plate.upper.thickness",
            "\"5 mm ± 0.5 mm\"",
            &millimetres,
            0.01,
        ),
        (
            "case_ii_concave30",
            "plate.upper.bow.height",
            "\"20 µm to 60 µm\"",
            &micrometres,
            0.01,
        ),
    ] {
        let before = std::time::Instant::now();
        Case {
            name,
            sets: &[],
            path,
            spread,
            write,
            choice: solved(),
            tolerance,
        }
        .holds();
        println!("{:?}", before.elapsed());
    }
}
