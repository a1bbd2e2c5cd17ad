//! The bars of the drivers: complete, the longest on top, errors instead of panics.

use ringsum::{
    estimate::Band,
    figures::{Drawing, FigureError, Format, render, svg},
    uncertainty::{Index, Ranked, Ranking, Scale, Share, Target},
};

use crate::{decoded, holds, texts};

fn ranked(input: &'static str, alone: [f64; 2], total: f64) -> Ranked {
    let share = |value: f64| Share {
        value,
        confidence: 0.01,
    };
    Ranked {
        input,
        remedy: "measure it".to_owned(),
        index: Index {
            first: share(0.9 * total),
            total: share(total),
        },
        alone,
        known: Band {
            low: Some(0.11),
            nominal: 0.12,
            high: Some(0.15),
        },
    }
}

pub fn ranking() -> Ranking {
    Ranking {
        title: "A joint".to_owned(),
        case: "hot",
        field: "elastic",
        resolution: "normal",
        target: Target::SourceToSink,
        draws: 4096,
        seed: 1,
        band: Band {
            low: Some(0.1),
            nominal: 0.12,
            high: Some(0.16),
        },
        draw_error: Some(0.01),
        interaction: 0.1,
        scale: Scale::Logarithm,
        inputs: vec![
            ranked("friction", [0.11, 0.125], 0.2),
            ranked("flatness, convex or concave", [0.15, 0.115], 0.7),
            ranked("nothing at all", [0.12, 0.12], 0.0),
        ],
    }
}

fn shown(ranking: Ranking) -> Result<String, FigureError> {
    svg(&Drawing::Tornado(Box::new(ranking)))
}

#[test]
fn every_bar_has_its_name_and_share_the_longest_on_top() {
    let document = shown(ranking()).expect("a figure");
    let texts = texts(&document);
    for part in [
        "A joint",
        "source to sink, K/W",
        "friction",
        "70\u{a0}%",
        "input at its 5 %",
        "input at its 95 %",
        "low and high of all inputs together",
    ] {
        assert!(holds(&texts, part), "{part}: {texts:#?}");
    }
    let place = |name: &str| texts.iter().position(|text| text.contains(name));
    assert!(place("flatness, convex").expect("drawn") < place("friction").expect("drawn"));
    let bytes = render(&Drawing::Tornado(Box::new(ranking())), Format::Png).expect("a figure");
    assert!(decoded(&bytes).0 > 600);
}

#[test]
fn bars_that_cannot_be_drawn_are_errors() {
    let mut empty = ranking();
    empty.inputs.clear();
    assert_eq!(shown(empty), Err(FigureError::Empty("the ranking")));
    for wrong in [f64::NAN, f64::INFINITY, 1e70] {
        let mut broken = ranking();
        broken.inputs[1].alone[0] = wrong;
        assert!(
            matches!(shown(broken), Err(FigureError::NotFinite(_))),
            "{wrong}"
        );
        let mut broken = ranking();
        broken.band.high = Some(wrong);
        assert!(
            matches!(shown(broken), Err(FigureError::NotFinite(_))),
            "{wrong}"
        );
    }
    // A constant answer has no shares and bars of no length, and is a figure all the same.
    let mut level = ranking();
    level.band = Band::nominal(0.12);
    for input in &mut level.inputs {
        input.alone = [0.12; 2];
        input.index.total.value = f64::NAN;
    }
    assert!(shown(level).is_ok());
}
