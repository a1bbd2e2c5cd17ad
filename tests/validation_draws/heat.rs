//! Heat and films that scatter: rises go with the heat, resistances do not, films drop as their sum.

use ringsum::{
    estimate::{Chain, Met, Options, Realisation},
    joint::{Joint, RequirementKind},
    uncertainty,
};

use crate::joints::{four_m4, read};

const OPTIONS: Options = Options {
    draws: 4096,
    seed: 2,
};

/// Four M4 between plates of which the cold one is cooled as told.
fn joint(heat: &str, cooled: &str, require: &str) -> Joint {
    let service = format!("heat = \"{heat}\"\nrequire = {{ {require} }}");
    read(&four_m4(&service, cooled, ""))
}

const FILM: &str = r#"cooled = { film = "500 W/(m²·K)" }"#;

// Uniform within ± 10 %: 5 % and 95 % lie at 0.91 and 1.09. The resistance scatters beside it, so that the
// rise is held against its own draws: the product of both at every draw.
#[test]
fn a_heat_with_a_spread_moves_the_rises_and_no_resistance() {
    let found = |heat: &str| {
        let joint = joint(heat, FILM, "rise = \"30 K\"");
        let chain = Chain::new(&joint).expect("a chain");
        let found = uncertainty::along(&chain, &OPTIONS).expect("a number");
        found.cases[0].clone()
    };
    let (fixed, spread) = (found("20 W"), found("20 W ± 10 %"));
    let resistance = |case: &ringsum::estimate::CaseResult| {
        let band = case.results.source_to_sink.resistance;
        [band.low.expect("draws"), band.high.expect("draws")]
    };
    // One more input is another sequence: what is left is the sampling error, 0.5 % at this number.
    for (one, other) in resistance(&fixed).iter().zip(resistance(&spread)) {
        assert!((one / other - 1.0).abs() < 0.005, "{one} {other}");
    }
    let [fixed_rise, rise] = [fixed.rise, spread.rise].map(|rise| rise.expect("heat"));
    assert!((rise.source.nominal / fixed_rise.source.nominal - 1.0).abs() < 1e-12);
    assert!(rise.source.high > fixed_rise.source.high);
    assert!(rise.source.low < fixed_rise.source.low);
    // The film holds still, so that the drop to the coolant goes with the heat alone.
    let drop = rise.coolant_drop.expect("a film");
    let [low, high] = rise.coolant_drop_ends.expect("the heat scatters");
    assert!((low / drop - 0.91).abs() < 0.002, "{low} {drop}");
    assert!((high / drop - 1.09).abs() < 0.002, "{high} {drop}");
    assert_eq!(fixed_rise.coolant_drop_ends, None);
    // What is required of the rise is held against its own band.
    let required = spread.requirement.expect("a limit");
    assert_eq!(Some(required.value), rise.source.high);
}

// Two strips of 60 mm by 12 and 24 mm side by side with 400 and 100 W/(m²·K): by hand the drop per watt is
// 1/(400 · 0.00072 + 100 · 0.00144) = 1/(0.288 + 0.144), and with the first film at 480 the conductance is
// 0.3456 + 0.144.
#[test]
fn films_side_by_side_drop_as_their_sum() {
    let cooled = r#"
cooled = [
    { film = "400 W/(m²·K) ± 20 %", centre = ["10 mm", "30 mm"], size = ["12 mm", "60 mm"] },
    { film = "100 W/(m²·K)", centre = ["40 mm", "30 mm"], size = ["24 mm", "60 mm"] },
]"#;
    let joint = joint("20 W", cooled, "rise = \"30 K\"");
    let high = joint.coolant_factor(&[1.0]);
    assert!((high - 0.432 / 0.4896).abs() < 1e-12, "{high}");
    assert!((joint.coolant_factor(&[]) - 1.0).abs() < 1e-15);
}

#[test]
fn a_limit_above_the_coolant_holds_the_film_too() {
    let cooled = r#"cooled = { film = "500 W/(m²·K) ± 20 %" }"#;
    for (of, kind) in [
        ("mean", RequirementKind::AboveCoolant),
        ("hottest", RequirementKind::HottestAboveCoolant),
    ] {
        let limit = |kelvin: f64| {
            let require = format!("rise = \"{kelvin} K\", of = \"{of}\", above = \"coolant\"");
            let joint = joint("20 W", cooled, &require);
            let chain = Chain::new(&joint).expect("a chain");
            let case = uncertainty::along(&chain, &OPTIONS)
                .expect("a number")
                .cases[0]
                .clone();
            let path = chain
                .state(0, &Realisation::default())
                .expect("a state")
                .path;
            (case, path)
        };
        let (case, path) = limit(1000.0);
        let required = case.requirement.expect("a limit");
        assert_eq!((required.kind, required.met), (kind, Met::Yes));
        let rise = case.rise.expect("heat");
        let above = rise.above_coolant.expect("a film");
        let band = above[usize::from(of == "hottest")];
        let own = if of == "hottest" {
            path.hottest
        } else {
            path.source_to_sink
        };
        let wanted = 20.0 * (own + path.coolant_drop.expect("a film"));
        assert!(
            (band.nominal / wanted - 1.0).abs() < 1e-12,
            "{band:?} {wanted}"
        );
        assert_eq!(Some(required.value), band.high);
        // More than the sink surface and the nominal film together.
        let least = rise.source.high.expect("draws") + rise.coolant_drop.expect("a film");
        assert!(required.value > least, "{required:?} {least}");
        let (case, _) = limit(0.5 * (band.nominal + required.value));
        assert_eq!(case.requirement.expect("a limit").met, Met::Uncertain);
    }
}
