//! Every caution of this file appears when it should and stays away from a sound joint.

use super::*;
use crate::{
    joint::{Bounds, Isolating},
    preload::fixture::{aluminium, datum, m6, m6_with},
};

fn supports() -> Supports {
    Supports::of(&aluminium(), &aluminium())
}

fn codes(fastener: &Fastener, supports: &Supports) -> Vec<&'static str> {
    let group = Group {
        name: "M6",
        fastener,
        supports,
    };
    let found = group_cautions(&group);
    assert!(found.iter().all(|caution| caution.text.starts_with("M6: ")));
    found.iter().map(|caution| caution.code).collect()
}

#[track_caller]
fn expect(fastener: &Fastener, code: &'static str) {
    let found = codes(fastener, &supports());
    assert!(found.contains(&code), "{found:?}");
}

#[test]
fn sound_joint_raises_no_caution() {
    assert_eq!(codes(&m6(), &supports()), Vec::<&str>::new());
}

#[test]
fn over_yield_comes_first() {
    let found = codes(&m6_with(|t| t.torque = 10.0), &supports());
    assert_eq!(found[0], "preload/over-yield");
    assert!(found.contains(&"preload/over-proof"));
    assert!(found.contains(&"preload/head-pressure"));
    assert!(found.contains(&"preload/never-for-conductance"));
    let found = codes(&m6_with(|t| t.torque = 7.4), &supports());
    assert_eq!(found, ["preload/over-90-percent"]);
}

#[test]
fn torque_in_the_wrong_unit_is_suspected() {
    // 7 N·m written as 62 N·m (they are 62 in·lbf), and as 0.79 N·m (7 in·lbf).
    for torque in [62.0, 0.79] {
        let bolt = m6_with(|t| t.torque = torque);
        expect(&bolt, "preload/suspicious-torque");
        let text = group_cautions(&Group {
            name: "M6",
            fastener: &bolt,
            supports: &supports(),
        });
        assert!(
            text.iter()
                .any(|caution| caution.text.contains("N·m or in·lbf?"))
        );
    }
    // Three times the torque is over yield, but no suspicion of units yet; nor is a third of it.
    for torque in [14.0, 2.4] {
        let found = codes(&m6_with(|t| t.torque = torque), &supports());
        assert!(!found.contains(&"preload/suspicious-torque"), "{found:?}");
    }
}

#[test]
fn idle_bolt_is_noticed_when_its_preload_is_given() {
    let mut idle = m6();
    idle.tightening = Tightening::Preload(Bounds::exact(1e3));
    assert_eq!(codes(&idle, &supports()), ["preload/low-use"]);
}

#[test]
fn grade_without_yield_strength_is_named() {
    let mut unknown = m6();
    unknown.grade.yield_strength = None;
    unknown.grade.proof = Some(datum(200e6));
    let found = codes(&unknown, &supports());
    assert_eq!(
        found[..2],
        ["preload/no-yield-strength", "preload/over-proof"]
    );
}

#[test]
fn seats_are_judged_head_and_nut() {
    let mut soft = supports();
    soft.head_limit = Some(100e6);
    soft.nut_limit = None;
    let found = codes(&m6(), &soft);
    assert!(found.contains(&"preload/head-pressure"));
    assert!(found.contains(&"preload/no-bearing-limit"));
    let mut cone = m6();
    cone.conical_seat = true;
    expect(&cone, "preload/countersunk");
}

#[test]
fn threads_are_judged_by_length_insert_and_metal() {
    let mut tapped = m6();
    tapped.engagement = Engagement::Tapped { length: 6e-3 };
    expect(&tapped, "preload/short-engagement");
    let mut insert = m6();
    insert.engagement = Engagement::Insert { length: 12e-3 };
    expect(&insert, "preload/insert");
    expect(&insert, "preload/running-torque");
    let mut small = m6();
    small.thread.diameter = 3e-3;
    expect(&small, "preload/settling-small-screw");
    let mut stainless = m6();
    stainless.grade.like = "304".into();
    stainless.engagement = Engagement::Tapped { length: 12e-3 };
    let mut steel = supports();
    steel.far.family = "stainless".into();
    assert!(codes(&stainless, &steel).contains(&"preload/galling"));
    assert!(!codes(&stainless, &supports()).contains(&"preload/galling"));
}

#[test]
fn dry_stainless_screw_and_nut_gall() {
    let dry = Bounds::uniform([0.2, 0.25, 0.35]);
    for friction in [
        Friction::Coefficients {
            thread: dry,
            head: dry,
        },
        Friction::NutFactor(dry),
    ] {
        let mut bolt = m6_with(|t| t.friction = friction);
        bolt.grade.like = "304".into();
        expect(&bolt, "preload/galling");
    }
}

#[test]
fn running_torque_that_eats_the_torque_is_named() {
    for running in [2.0, 7.0] {
        let bolt = m6_with(|t| {
            t.running = running;
            t.running_stated = true;
        });
        expect(&bolt, "preload/running-torque");
    }
}

#[test]
fn a_stated_scatter_of_the_running_torque_is_not_said_to_be_missing() {
    let told = |spread: Option<Bounds>| {
        let bolt = m6_with(|t| {
            t.running = 2.0;
            t.running_spread = spread;
            t.running_stated = true;
        });
        let found = group_cautions(&Group {
            name: "M6",
            fastener: &bolt,
            supports: &supports(),
        });
        let told = found
            .into_iter()
            .find(|told| told.code == "preload/running-torque");
        told.expect("a large running torque is told").text
    };
    assert!(told(None).contains("not counted"));
    let counted = told(Some(Bounds::uniform([1.5, 2.0, 2.5])));
    assert!(!counted.contains("not counted"), "{counted}");
}

#[test]
fn wild_scatter_is_named() {
    expect(
        &m6_with(|t| t.scatter = Some(0.6)),
        "preload/friction-scatter",
    );
}

#[test]
fn opened_joint_is_named_only_when_negative() {
    assert_eq!(opened("M6", 10.0), None);
    let caution = opened("M6", -150.4).unwrap();
    assert_eq!(caution.code, "preload/negative-service-force");
    assert!(caution.text.contains("150 N"));
}

#[test]
fn a_bolt_that_keeps_less_than_a_tenth_is_named() {
    let named = |left: f64| hardly_clamped("M6", [2000.0, left]);
    // From a tenth on it keeps enough; below nothing it has opened, which is told of its own.
    assert_eq!(named(200.0), None);
    assert_eq!(named(-0.1), None);
    for left in [0.0, 2.3, 199.9] {
        let caution = named(left).unwrap();
        assert_eq!(caution.code, "preload/hardly-clamped");
        assert!(caution.text.contains("of 2000 N"), "{}", caution.text);
    }
    assert!(named(2.3).unwrap().text.contains("2 N of 2000 N, 0.1 %"));
}

#[test]
fn torque_window_carries_its_duties() {
    let supports = supports();
    let codes = |fastener: &Fastener| -> Vec<&'static str> {
        let group = Group {
            name: "M6",
            fastener,
            supports: &supports,
        };
        let largest = largest_torque(fastener, &supports);
        window_cautions(&group, largest)
            .iter()
            .map(|c| c.code)
            .collect()
    };
    assert_eq!(
        codes(&m6()),
        ["preload/no-torque-card", "preload/slip-and-fatigue"]
    );
    let mut given = m6();
    given.tightening = Tightening::Preload(Bounds::exact(5e3));
    assert_eq!(codes(&given), ["preload/slip-and-fatigue"]);
    // A torque that only service ends is told with that limit, and as none where none holds there.
    let fastener = m6();
    let group = Group {
        name: "M6",
        fastener: &fastener,
        supports: &supports,
    };
    let told = |largest| window_cautions(&group, largest)[0].text.clone();
    let text = told(Some((4.0, limits::IN_SERVICE)));
    assert!(
        text.contains("4.000 N·m") && text.contains(limits::IN_SERVICE),
        "{text}"
    );
    assert!(told(None).contains("at no torque"), "{}", told(None));
}

#[test]
fn a_bolt_that_just_reaches_yield_does_not_yield_yet() {
    let mut bolt = m6();
    let reached = limits::stress(&bolt, Place::HIGHEST_FORCE);
    bolt.grade.yield_strength = Some(datum(reached));
    // The same number over itself: exactly one.
    assert_eq!(
        strength_use(&bolt).map(|[_, high]| high.to_bits()),
        Some(f64::to_bits(1.0))
    );
    expect(&bolt, "preload/over-90-percent");
    assert!(!codes(&bolt, &supports()).contains(&"preload/over-yield"));
    bolt.grade.yield_strength = Some(datum(reached * (1.0 - 1e-9)));
    expect(&bolt, "preload/over-yield");
}

#[test]
fn isolating_washers_of_plastic_creep_and_those_of_ceramic_do_not() {
    let washers = |kind: MaterialKind, bearing_limit: f64| {
        let mut material = aluminium();
        material.kind = kind;
        material.bearing_limit = Some(datum(bearing_limit));
        let mut bolt = m6();
        bolt.isolating = Some(Isolating {
            material,
            thickness: 1.5e-3,
            count: 2,
        });
        bolt
    };
    let creeps = codes(&washers(MaterialKind::Polymer, 1e9), &supports());
    assert_eq!(creeps, ["preload/isolating-creep"]);
    let sound = codes(&washers(MaterialKind::Brittle, 1e9), &supports());
    assert_eq!(sound, Vec::<&str>::new());
    let crushed = codes(&washers(MaterialKind::Brittle, 50e6), &supports());
    assert_eq!(crushed, ["preload/head-pressure"]);
}
