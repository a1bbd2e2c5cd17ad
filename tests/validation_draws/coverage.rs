//! Whether the printed band holds what it says: a thousand joints whose truth is known.

use rayon::prelude::*;
use ringsum::{
    estimate::{Chain, Options, Realisation},
    joint,
    numerics::sampling::Sobol,
    uncertainty,
};

const JOINTS: u64 = 1000;

/// A number between 0 and 1 that belongs to a joint and a purpose, independent of all draws: beyond
/// its table the sequence is made of independent numbers.
fn chance(joint: u64, purpose: usize) -> f64 {
    let mut point = vec![0.0; 65 + 32];
    Sobol::new(point.len(), 0xC0FE).point(joint as u32, &mut point);
    point[65 + purpose]
}

/// A round joint of its own torque, plates, faces and medium.
fn text(index: u64) -> String {
    let between = |purpose: usize, low: f64, high: f64| low + chance(index, purpose) * (high - low);
    let medium = if chance(index, 0) < 0.5 {
        "vacuum"
    } else {
        "air"
    };
    format!(
        r#"
        [service]
        medium = "{medium}"
        [[plate]]
        name = "warm"
        material = "Al 6061-T6"
        thickness = "{:.2} mm"
        diameter = "50 mm"
        finish = {{ roughness = "Ra {:.2} µm" }}
        [[plate]]
        name = "cold"
        material = "Al 7075-T73"
        thickness = "{:.2} mm"
        diameter = "50 mm"
        finish = {{ roughness = "Ra {:.2} µm" }}
        cooled = {{ film = "{:.0} W/(m²·K)" }}
        [fastener]
        thread = "M5"
        grade = "8.8"
        head = "socket"
        hole = "5.5 mm"
        engagement = {{ kind = "nut" }}
        torque = {{ value = "{:.2} N·m", tolerance = "10 %" }}
        friction = {{ class = "B" }}
        at = ["0 mm", "0 mm"]
        "#,
        between(1, 3.0, 10.0),
        between(2, 0.4, 3.2),
        between(3, 3.0, 10.0),
        between(4, 0.4, 3.2),
        between(5, 500.0, 5000.0),
        between(6, 1.0, 5.0),
    )
}

/// Whether the truth of a joint lies in the printed band of source to sink, and in that of the contact.
fn held(index: u64) -> [bool; 2] {
    let joint = joint::read(&text(index)).unwrap_or_else(|faults| panic!("{faults:?}"));
    let chain = Chain::new(&joint).expect("a chain");
    let inputs = uncertainty::inputs(&chain);
    let mut truth = Realisation::default();
    for (purpose, input) in inputs.iter().enumerate() {
        (input.place)(&mut truth, chance(index, 7 + purpose));
    }
    let truth = chain.state(0, &truth).expect("a state").path;
    let options = Options {
        draws: 256,
        seed: index,
    };
    let found = uncertainty::along(&chain, &options).expect("a number");
    let results = &found.cases[0].results;
    [
        (results.source_to_sink.resistance, truth.source_to_sink),
        (results.contact.resistance, truth.contact.recip()),
    ]
    .map(|(band, truth)| {
        let (low, high) = band.low.zip(band.high).expect("a band");
        (low..=high).contains(&truth)
    })
}

// 90 % of a thousand independent truths lie within 871 to 928 with three standard deviations of
// √(1000 · 0.9 · 0.1) = 9.5; the brackets leave out a band that is 5 % or 95 % on one side only.
#[test]
fn printed_bands_hold_nine_truths_of_ten() {
    let all: Vec<[bool; 2]> = (0..JOINTS).into_par_iter().map(held).collect();
    for (result, name) in ["source to sink", "contact"].iter().enumerate() {
        let count = all.iter().filter(|held| held[result]).count();
        assert!((870..=930).contains(&count), "{name}: {count} of {JOINTS}");
    }
}
