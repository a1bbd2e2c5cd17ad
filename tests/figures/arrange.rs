//! A search of layouts to draw.

use ringsum::{
    figures::{ArrangePlot, Drawing, PlanShape, svg},
    joint::{Family, Limit},
    layout::{Answer, Goal, InCase, Measure, Row, Solution, Target, Verdict},
};

fn row(bolts: usize, nominal: f64, verdict: Verdict) -> Row {
    Row {
        label: "M4 A2-70".into(),
        size: None,
        torque: Some(1.5),
        family: Family::Edge,
        refined: false,
        places: (0..bolts)
            .map(|bolt| [0.01 + 0.008 * bolt as f64, 0.02])
            .collect(),
        over_heat: 0,
        mass: 2.8e-3 * bolts as f64,
        screened: 1.05 * nominal,
        solution: Some(Solution {
            cases: vec![InCase {
                source_to_sink: nominal,
                nominal,
                least_force: 1.2 * nominal,
                largest_force: 0.95 * nominal,
            }],
        }),
        case: 0,
        band: Some(vec![[0.9 * nominal, 1.3 * nominal]]),
        verdict,
        front: true,
    }
}

pub fn plot() -> ArrangePlot {
    let rows = vec![
        row(2, 0.3, Verdict::NotMet),
        row(4, 0.19, Verdict::AtNominal),
        Row {
            solution: None,
            front: false,
            ..row(5, 0.17, Verdict::Screened)
        },
        row(6, 0.12, Verdict::Met),
    ];
    ArrangePlot {
        heads: vec![4e-3; rows.len()],
        answer: Answer {
            title: "Box on panel".into(),
            cases: vec!["hot"],
            screened_case: "hot",
            fixed: Vec::new(),
            goal: Goal::Bolts,
            target: Target {
                measure: Measure::SourceToSink,
                limit: Some((0.2, Limit::Most)),
            },
            heat: Some(10.0),
            rows,
            best: Some(3),
            rules: 100,
            complete: true,
            passed_over: Vec::new(),
        },
        plates: vec![PlanShape::Rectangle {
            corner: [0.0, 0.0],
            size: [0.07, 0.04],
        }],
        keep_out: vec![PlanShape::Disc {
            centre: [0.05, 0.03],
            radius: 5e-3,
        }],
    }
}

pub fn drawing() -> Drawing {
    Drawing::Arrange(Box::new(plot()))
}

#[test]
fn a_search_shows_limit_costs_and_the_plans_of_its_front() {
    let text = svg(&drawing()).unwrap();
    for part in [
        "source to sink, K/W",
        "source to sink against bolts",
        "required",
        "≤ 0.2",
        "2 × M4 A2-70",
        "6 × M4 A2-70",
        "0.1200 K/W",
    ] {
        assert!(text.contains(part), "{part} is missing");
    }
    // Five bolts are no part of the front.
    assert!(!text.contains("5 × M4"));
}

#[test]
fn what_cannot_be_drawn_of_a_search_is_an_error() {
    let mut empty = plot();
    empty.answer.rows.clear();
    let mut odd = plot();
    odd.heads.pop();
    let mut blocked = plot();
    blocked.answer.rows[0].solution = None;
    blocked.answer.rows[0].screened = f64::INFINITY;
    for plot in [empty, odd, blocked] {
        assert!(svg(&Drawing::Arrange(Box::new(plot))).is_err());
    }
}
