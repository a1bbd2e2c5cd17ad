//! Drawings in other units: each names its unit, ticks are round in it, marks lie where they should.

use ringsum::{
    figures::{Drawing, PlanMap, svg_in},
    units::System,
};

use crate::{cumulative, every_drawing, field, furnished, holds, sweep, texts};

/// What no drawing in inches and pounds may hold.
const METRIC: [&str; 8] = [" mm", "µm", "MPa", "N·m", " kN", "W/(m²", " kg", ", g"];

#[test]
fn every_drawing_names_its_unit_and_none_of_another_system() {
    let named: [(usize, &[&str]); 11] = [
        (0, &["contact pressure, psi", "x, in", "y, in"]),
        (1, &["local conductance, Btu/(h·ft²·°F)", "x, in"]),
        (2, &["distance from the bolt axis, in", "conductance, W/K"]),
        (4, &["torque, in·lbf", "source to sink, K/W"]),
        (5, &["pressure, psi", "contact conductance, Btu/(h·ft²·°F)"]),
        (6, &["contact pressure, psi", "gap, mil", "x, in", "y, in"]),
        (7, &["gap, mil"]),
        (10, &["x, in"]),
        (11, &["height, in", "x, in, at y = 0.472 in"]),
        (12, &["contact pressure, psi", "4 bolts, 0.26 lb"]),
        (14, &["x, in", "y, in"]),
    ];
    let all = every_drawing();
    for (index, parts) in named {
        let texts = texts(&svg_in(&all[index], System::Inch).unwrap());
        for part in parts {
            assert!(holds(&texts, part), "{part} is missing in {texts:?}");
        }
    }
    for drawing in all {
        if matches!(drawing, Drawing::Evidence(_)) {
            let [si, inch] = [System::Si, System::Inch].map(|units| svg_in(&drawing, units));
            assert_eq!(si, inch, "the evidence stays as its sources tell it");
            continue;
        }
        let inch = texts(&svg_in(&drawing, System::Inch).unwrap());
        for unit in METRIC {
            assert!(!holds(&inch, unit), "{unit} stands in {inch:?}");
        }
        let shop = texts(&svg_in(&drawing, System::Shop).unwrap());
        assert!(!holds(&shop, "MPa"), "{shop:?}");
    }
    let shop = texts(&svg_in(&every_drawing()[0], System::Shop).unwrap());
    assert!(holds(&shop, "contact pressure, N/mm²") && holds(&shop, "at most 23.0 N/mm²"));
}

/// A text with its place and its anchor.
type Placed = ([f64; 2], String, String);

/// The value of an attribute of a tag.
fn attribute<'a>(tag: &'a str, name: &str) -> &'a str {
    let start = tag.find(&format!(" {name}=\"")).expect("the attribute") + name.len() + 3;
    tag[start..].split('"').next().expect("it ends")
}

fn number(tag: &str, name: &str) -> f64 {
    attribute(tag, name).parse().expect("a number")
}

fn placed(document: &str) -> Vec<Placed> {
    let pieces = document.split("<text").skip(1);
    pieces
        .map(|piece| {
            let (tag, rest) = piece.split_once('>').expect("a tag ends");
            let content = rest.split('<').next().expect("a text").trim();
            (
                ["x", "y"].map(|name| number(tag, name)),
                attribute(tag, "text-anchor").to_owned(),
                content.to_owned(),
            )
        })
        .collect()
}

/// Values and places of the ticks over the title of a lower axis.
fn ticks(document: &str, title: &str) -> Vec<[f64; 2]> {
    let all = placed(document);
    let ([_, under], ..) = all
        .iter()
        .find(|(_, _, text)| text == title)
        .unwrap_or_else(|| panic!("{title}"));
    let value = |text: &str| {
        let plain = text.replace('\u{2009}', "").replace('−', "-");
        plain.parse::<f64>().ok()
    };
    let over = |(at, anchor, _): &&Placed| anchor == "middle" && at[1] < *under;
    let ticks = all.iter().filter(over);
    let ticks: Vec<([f64; 2], f64)> = ticks
        .filter_map(|(at, _, text)| Some((*at, value(text)?)))
        .collect();
    let nearest = ticks.iter().map(|(at, _)| at[1]).fold(0.0, f64::max);
    let row = ticks
        .iter()
        .filter(|(at, _)| (at[1] - nearest).abs() < 1e-9);
    row.map(|(at, value)| [*value, at[0]]).collect()
}

/// The value that an axis tells at a place.
fn told(ticks: &[[f64; 2]], place: f64) -> f64 {
    let ([low, from], [high, to]) = (ticks[0], ticks[ticks.len() - 1]);
    low + (high - low) * (place - from) / (to - from)
}

/// Centres of the circles of a radius, in quarters of a point.
fn circles(document: &str, radius: f64) -> Vec<f64> {
    let circles = document.split("<circle").skip(1);
    let circles = circles.map(|piece| piece.split('>').next().expect("a tag ends"));
    circles
        .filter(|tag| (number(tag, "r") - radius).abs() < 1e-9)
        .map(|tag| number(tag, "cx"))
        .collect()
}

#[test]
fn ticks_are_round_in_the_unit_that_is_named() {
    let map = furnished(PlanMap::pressure("", &field()));
    for (drawing, units, title) in [
        (Drawing::Plan(Box::new(map)), System::Inch, "x, in"),
        (
            Drawing::Torque(Box::new(sweep())),
            System::Inch,
            "torque, in·lbf",
        ),
        (
            Drawing::Cumulative(cumulative(1)),
            System::Inch,
            "distance from the bolt axis, in",
        ),
        (
            Drawing::Torque(Box::new(sweep())),
            System::Shop,
            "torque, N·m",
        ),
    ] {
        let ticks = ticks(&svg_in(&drawing, units).unwrap(), title);
        assert!(ticks.len() > 2, "{title}: {ticks:?}");
        let step = ticks[1][0] - ticks[0][0];
        let lead = step / 10_f64.powf((step.log10() + 1e-9).floor());
        // Differences of decimals are off by rounding alone.
        let round = [1.0, 2.0, 5.0].iter().any(|one| (lead - one).abs() < 1e-9);
        assert!(round, "{title}: {ticks:?}");
        for pair in ticks.windows(2) {
            assert!((pair[1][0] - pair[0][0] - step).abs() < 1e-9 * ticks[2][0].abs());
        }
        // A tick is a multiple of the step, not a number of the other system with its decimals.
        for [value, _] in &ticks {
            assert!(
                (value / step - (value / step).round()).abs() < 1e-6,
                "{value}"
            );
        }
    }
}

#[test]
fn marks_lie_at_the_values_of_the_axis_beside_them() {
    // Places are kept to a quarter of a point, which is 0.0015 in on this map of 400 points for
    // 2.36 in; two ends of the axis and the mark make three roundings.
    let map = Drawing::Plan(Box::new(furnished(PlanMap::pressure("", &field()))));
    let document = svg_in(&map, System::Inch).unwrap();
    let axis = ticks(&document, "x, in");
    let hole = (2.2e-3 * 400.0 / 0.06 * 4.0_f64).round();
    let found = circles(&document, hole);
    // The bolts stand at 12, 48 and 30 mm.
    for (place, value) in found.iter().zip([12.0, 48.0, 30.0]) {
        let value = value / 25.4;
        assert!((told(&axis, *place) - value).abs() < 0.005, "{value}");
    }
    assert!(found.len() >= 3);

    // The best torque, 2.8 N·m by 0.1129848 N·m to the inch pound; 33 in·lbf on 440 points.
    let document = svg_in(&Drawing::Torque(Box::new(sweep())), System::Inch).unwrap();
    let axis = ticks(&document, "torque, in·lbf");
    let best = told(&axis, circles(&document, 18.0)[0]);
    assert!((best - 24.78).abs() < 0.06, "{best}");
    let texts = texts(&document);
    assert!(holds(&texts, "stated 19.5 in·lbf") && holds(&texts, "largest 25.7 in·lbf"));

    // Half of the conductance is gathered at 11.5 mm.
    let document = svg_in(&Drawing::Cumulative(cumulative(1)), System::Inch).unwrap();
    let axis = ticks(&document, "distance from the bolt axis, in");
    let half = told(&axis, circles(&document, 12.0)[0]);
    assert!((half - 11.5 / 25.4).abs() < 0.003, "{half}");
}
