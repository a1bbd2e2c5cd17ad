//! The ranking of inputs: what its intervals do not tell is called so.

use ringsum::{
    estimate::Band,
    report::drivers,
    uncertainty::{Index, Ranked, Ranking, Scale, Share, Target},
};

fn ranked(input: &'static str, total: f64, confidence: f64) -> Ranked {
    let share = Share {
        value: total,
        confidence,
    };
    Ranked {
        input,
        remedy: "measure it".to_owned(),
        index: Index {
            first: share,
            total: share,
        },
        alone: [0.11, 0.13],
        known: Band {
            low: Some(0.11),
            nominal: 0.12,
            high: Some(0.15),
        },
    }
}

#[test]
fn shares_within_their_intervals_are_not_told_apart() {
    let ranking = Ranking {
        title: "A joint".to_owned(),
        case: "service",
        field: "cone",
        resolution: "normal",
        target: Target::SourceToSink,
        draws: 256,
        seed: 1,
        band: Band {
            low: Some(0.1),
            nominal: 0.12,
            high: Some(0.16),
        },
        draw_error: None,
        interaction: 0.0,
        scale: Scale::Logarithm,
        inputs: vec![
            ranked("friction", 0.6, 0.05),
            ranked("hardness of the faces", 0.03, 0.04),
            ranked("gas in the gaps", 0.0, 0.0),
        ],
    };
    assert_eq!(ranking.not_told_apart(), ["hardness of the faces"]);
    let text = drivers::text(&ranking);
    for part in [
        "60.0 ± 5.0 ",
        "3.0 ± 4.0?",
        "cannot be told apart by it: hardness of the faces;",
    ] {
        let words = text.split_whitespace().collect::<Vec<_>>().join(" ");
        assert!(words.contains(part), "{part}: {text}");
    }
    let object = drivers::json(&ranking);
    let told: Vec<bool> = object["inputs"]
        .as_array()
        .expect("inputs")
        .iter()
        .map(|input| input["told_apart"].as_bool().expect("a flag"))
        .collect();
    assert_eq!(told, [true, false, true]);
}
