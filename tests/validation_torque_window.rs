//! The ends of the torque window against a fine sweep of the same chain, on the closed-form field.

#[path = "shared/joints.rs"]
mod joints;

use joints::{four_m4, read};
use ringsum::{
    estimate::{Chain, Judged, Options, Range, Side, TorqueSweep, Trial},
    joint::{self, Joint},
    layout,
    report::sweep as report,
    uncertainty::{FIRST, REQUIREMENT, SweepOptions, sweep_beside, torque_sweep},
};

/// Four M4 in aluminium in vacuum, with a load along the bolts and a limit of the rise.
fn text(rise: &str, load: &str) -> String {
    let fastener = format!(
        "engagement = {{ kind = \"tapped\", length = \"8 mm\" }}\n\
         axial_load = {{ value = \"{load}\", introduction = 0.5, lasting = false }}"
    );
    four_m4(
        &format!("temperature = \"20 °C\"\nheat = \"20 W\"\nrequire = {{ rise = \"{rise}\" }}"),
        "cooled = { face = \"isothermal\" }",
        &fastener,
    )
}

fn joint(rise: &str, load: &str) -> Joint {
    read(&text(rise, load))
}

fn options(steps: usize, confidence: f64) -> SweepOptions {
    SweepOptions {
        group: 0,
        from: Some(0.2),
        to: Some(3.0),
        steps,
        confidence,
        chain: Options { draws: 64, seed: 1 },
    }
}

fn swept(joint: &Joint, steps: usize, confidence: f64) -> TorqueSweep {
    torque_sweep(joint, &options(steps, confidence)).expect("a sweep")
}

/// First torque of a fine sweep at which the high end of the band meets the limit, and the step.
fn fine(joint: &Joint, confidence: f64) -> (f64, f64) {
    let fine = swept(joint, 201, confidence);
    let (limit, _) = fine.required.expect("a rise over the heat");
    let first = fine
        .points
        .iter()
        .find(|point| point.source_to_sink.high.expect("draws were made") <= limit)
        .expect("some torque meets it");
    (first.torque, 2.8 / 200.0)
}

/// A rise that a middle torque just meets at the high end of the band.
fn middling() -> String {
    let sweep = swept(&joint("1000 K", "0 N"), 5, 0.9);
    let high = sweep.points[2]
        .source_to_sink
        .high
        .expect("draws were made");
    format!("{} K", 20.0 * high * 1.02)
}

#[test]
fn the_lower_end_is_where_a_fine_sweep_first_meets_the_requirement() {
    let rise = middling();
    let joint = joint(&rise, "0 N");
    for confidence in [0.9, 0.6] {
        let window = swept(&joint, 5, confidence).window;
        let heat = window.heat.expect("a rise is required");
        assert_eq!(heat.len(), 1, "{heat:?}");
        assert_eq!(heat[0].low.by, REQUIREMENT);
        let (first, step) = fine(&joint, confidence);
        // The end is found to 0.1 % of the largest torque, the fine sweep to its step.
        let found = heat[0].low.torque;
        assert!(
            (first - step - 0.003..=first + 0.003).contains(&found),
            "{found} {first} at {confidence}"
        );
    }
}

#[test]
fn less_confidence_asks_for_less_torque() {
    let rise = middling();
    let joint = joint(&rise, "0 N");
    let low = |confidence: f64| {
        let heat = swept(&joint, 5, confidence).window.heat.unwrap();
        heat[0].low.torque
    };
    assert!(low(0.5) < low(0.9));
}

#[test]
fn strength_and_separation_end_where_a_fine_sweep_says() {
    let joint = joint("1000 K", "300 N");
    let window = swept(&joint, 5, 0.9).window;
    let strength = window.strength.expect("both are known");
    let fine = swept(&joint, 201, 0.9);
    let step = 2.8 / 200.0;
    // The last torque that passes every limit of strength.
    let last = fine
        .points
        .iter()
        .rfind(|point| point.passes)
        .expect("low torques pass");
    assert!((last.torque..=last.torque + step).contains(&strength.high.torque));
    // The least force in service must carry 1.2 times what 300 N take from the faces.
    let separation = window
        .limits
        .iter()
        .find(|limit| limit.side == Side::Least)
        .expect("a load asks for force");
    assert!((separation.torque - strength.low.torque).abs() < 1e-12);
    // 1.7 N·m clamps at least about 1.75 kN at assembly, of which settling, relaxation and the other
    // bolts take about 1 kN: 360 N and the losses need some 0.9 to 1.6 N·m.
    assert!((0.5..2.0).contains(&separation.torque), "{separation:?}");
    let Range { low, high } = window.both.expect("1000 K are met by any torque");
    assert_eq!(low, strength.low);
    assert_eq!(high, strength.high);
}

#[test]
fn the_knee_has_nine_tenths_of_the_conductance_at_the_best() {
    let joint = joint("1000 K", "0 N");
    let sweep = swept(&joint, 5, 0.9);
    let knee = sweep.window.knee.expect("vacuum gains by force");
    let fine = swept(&joint, 201, 0.9);
    let (largest, _) = sweep.largest.expect("a yield strength");
    // What the joint adds at the largest torque, linear between two fine rows.
    let pair = fine
        .points
        .windows(2)
        .find(|pair| pair[0].torque <= largest && largest <= pair[1].torque)
        .expect("the largest torque is swept");
    let share = (largest - pair[0].torque) / (pair[1].torque - pair[0].torque);
    let [one, other] = [&pair[0], &pair[1]].map(|point| point.added_by_joint.nominal);
    let least = one + share * (other - one);
    let first = fine
        .points
        .iter()
        .find(|point| point.added_by_joint.nominal <= least / 0.9)
        .expect("the best row does");
    let step = 2.8 / 200.0;
    assert!(
        (first.torque - step - 0.003..=first.torque + 0.003).contains(&knee),
        "{knee} {}",
        first.torque
    );
}

#[test]
fn a_shut_window_tries_changes_one_at_a_time() {
    // A rise that is met at the first row beyond strength.
    let open = swept(&joint("1000 K", "0 N"), 5, 0.9);
    let mut rows = open.points.iter();
    let beyond = rows
        .find(|point| !point.passes)
        .expect("rows go beyond strength");
    let high = beyond.source_to_sink.high.expect("draws were made");
    let joint = joint(&format!("{} K", 20.0 * high), "0 N");
    let window = swept(&joint, 5, 0.9).window;
    assert!(window.both.is_none(), "{window:?}");
    assert!(!window.plates_fail);
    let ratio = window.force_ratio.expect("heat asks for more force");
    assert!(ratio > 1.0);
    // Stress areas of ISO 898-1, mm²: M4 8.78, M5 14.2, M6 20.1.
    let larger = if ratio <= 14.2 / 8.78 { "M5" } else { "M6" };
    assert!(ratio < 20.1 / 8.78, "{ratio}");
    assert_eq!(window.larger_thread.as_deref(), Some(larger));
    // Friction, tool, elongation, grade.
    assert_eq!(window.trials.len(), 4, "{:?}", window.trials);
    for trial in &window.trials {
        let Some(range) = trial.window else { continue };
        assert!(range.low.by != FIRST && range.low.torque < range.high.torque);
    }
    let elongation = window
        .trials
        .iter()
        .find(|trial| trial.change.contains("elongation"))
        .expect("it is tried");
    // Bolts of known elongation may be tightened closer to their strength: the low end rises most.
    assert!(elongation.window.is_some(), "{:?}", window.trials);
}

#[test]
fn what_perfect_contact_fails_no_torque_meets() {
    let window = swept(&joint("0.001 K", "0 N"), 3, 0.9).window;
    assert!(window.plates_fail && window.both.is_none());
    assert!(window.trials.is_empty());
    assert_eq!(window.heat, Some(Vec::new()));
}

#[test]
fn the_same_digits_come_again() {
    let joint = joint(&middling(), "100 N");
    assert_eq!(swept(&joint, 5, 0.9), swept(&joint, 5, 0.9));
}

/// The window of a joint in a wide sweep, none where it is shut.
fn window_of(text: &str) -> Option<Range> {
    let options = SweepOptions {
        to: Some(12.0),
        ..options(41, 0.9)
    };
    torque_sweep(&read(text), &options)
        .expect("a sweep")
        .window
        .both
}

/// What larger bolts, more of them and fillers open is what a sweep of the joint changed by hand says.
#[test]
fn joints_that_open_a_shut_window_do_so_in_a_sweep_of_their_own() {
    // Seats of the size where the first one's would not do; room for a third bolt in a row.
    let text = |rise: &str| {
        text(rise, "0 N")
            .replace(
                "size = [\"60 mm\", \"60 mm\"]",
                "size = [\"80 mm\", \"40 mm\"]",
            )
            .replace("torque =", "hole = \"4.5 mm\"\ntorque =")
    };
    let by_hand = |change: &str, rise: &str| {
        let text = text(rise);
        let (from, to) = match change {
            "M5 instead of M4" => ("\"M4\"", "\"M5\""),
            "M6 instead of M4" => ("\"M4\"", "\"M6\""),
            "6 bolts instead of 4, one more in each row" => ("count = [2, 2]", "count = [3, 2]"),
            filler => {
                let name = filler.replace(" between the faces", "");
                return format!("{text}[filler]\nname = \"{name}\"\n");
            }
        };
        let changed = text.replace(from, to);
        if from.starts_with('"') {
            changed.replace("hole = \"4.5 mm\"\n", "")
        } else {
            changed
        }
    };
    // A limit that M4 misses and M5 meets: between their best ends.
    let best = |text: &str| {
        let found = torque_sweep(&read(text), &options(41, 0.9)).expect("a sweep");
        let passing = found.points.iter().filter(|point| point.passes);
        passing
            .map(|point| point.source_to_sink.high.expect("draws were made"))
            .fold(f64::INFINITY, f64::min)
    };
    let easy = "1000 K";
    let [m4, m5] = [text(easy), by_hand("M5 instead of M4", easy)].map(|text| best(&text));
    assert!(m5 < m4, "{m5} {m4}");
    let rise = format!("{} K", 20.0 * (m4 * m5).sqrt());
    let (joint, own) = (read(&text(&rise)), text(&rise));
    let chain = Chain::new(&joint).expect("a cone");
    let again =
        |text: &str, sets: &[String]| joint::read_with(text, sets).map_err(|faults| faults.first());
    let sweep = sweep_beside(&chain, &options(5, 0.9), &|| {
        layout::alternatives((&joint, 0), &own, &again)
    })
    .expect("a sweep");
    assert!(sweep.window.both.is_none(), "{:?}", sweep.window);
    let known = ["instead of", "between the faces"];
    let others: Vec<&Trial> = sweep
        .window
        .trials
        .iter()
        .filter(|trial| known.iter().any(|words| trial.change.contains(words)))
        .collect();
    assert_eq!(others.len(), 7, "{others:#?}");
    let mut opened = 0;
    for trial in others {
        if let Judged::Refused(why) = &trial.judged {
            // M6 wants twelve millimetres to the edge and has ten; nothing else is refused.
            assert!(
                trial.change.starts_with("M6") && why.contains("2.0 mm"),
                "{trial:?}"
            );
            continue;
        }
        let by_hand = window_of(&by_hand(&trial.change, &rise));
        match (trial.window, by_hand) {
            (None, None) => {}
            (Some(trial_range), Some(by_hand)) => {
                opened += 1;
                // Both ends are found to 0.1 % of the largest torque swept, 12 N m.
                let off = trial_range.low.torque - by_hand.low.torque;
                let far = trial_range.high.torque - by_hand.high.torque;
                assert!(
                    off.abs() < 0.015 && far.abs() < 0.015,
                    "{trial:?} {by_hand:?}"
                );
            }
            (trial_window, by_hand) => {
                panic!("{}: {trial_window:?} {by_hand:?}", trial.change)
            }
        }
    }
    assert!(opened >= 2, "{:#?}", sweep.window.trials);
}

/// The joint of a load along the bolts that is to resist.
fn resisting(load: &str) -> Joint {
    let text = text("1000 K", load).replace(
        "require = { rise = \"1000 K\" }",
        "require = { resistance = \"0.001 K/W\", bound = \"least\" }",
    );
    read(&text)
}

// Less torque resists more, down to where the faces part.
#[test]
fn the_best_torque_keeps_the_faces_together() {
    let sweep = swept(&resisting("300 N"), 5, 0.9);
    let least = sweep.window.least().expect("a load asks for force").torque;
    assert!(sweep.points[0].torque < least, "{least}");
    let best = sweep.best.expect("a torque between both limits");
    assert!((best - least).abs() < 1e-9, "{best} {least}");
    assert_eq!(sweep.at_limit.map(|limit| limit.torque), sweep.best);
    let text = report::torque(&sweep);
    assert!(
        text.contains("highest source to sink that separation allows"),
        "{text}"
    );
    // With rows between the limits too.
    let fine = swept(&resisting("300 N"), 41, 0.9).best.expect("a torque");
    assert!((fine - least).abs() < 1e-9, "{fine} {least}");
}

#[test]
fn the_stated_torque_is_a_row_and_told_where_it_stands() {
    let sweep = swept(&joint("1000 K", "300 N"), 5, 0.9);
    assert_eq!(sweep.points.len(), 6);
    let at = |torque: f64| {
        let rows = sweep.points.iter();
        rows.filter(|row| (row.torque - torque).abs() < 1e-12)
            .count()
    };
    // The stated 1.7 N·m, and the ends of the range that was asked for.
    assert_eq!([at(1.7), at(0.2), at(3.0)], [1; 3]);
    let row = sweep
        .points
        .iter()
        .find(|row| row.torque > 1.6)
        .expect("rows");
    assert!((row.source_to_sink.nominal / sweep.at_stated - 1.0).abs() < 1e-12);
    let most = sweep.window.most().expect("strength is known");
    let told = |torque: f64| {
        let mut changed = sweep.clone();
        changed.stated = torque;
        report::torque(&changed)
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ")
    };
    let inside = 0.5 * (most.torque + sweep.window.least().expect("a load").torque);
    assert!(told(inside).contains("N·m lies inside"), "{}", told(inside));
    let beyond = told(1.01 * most.torque);
    assert!(
        beyond.contains(&format!("lies outside: beyond {}", most.name)),
        "{beyond}"
    );
    assert!(
        told(0.3).contains("lies outside: below separation"),
        "{}",
        told(0.3)
    );
}
