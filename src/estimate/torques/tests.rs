//! Torques of limits against the limits themselves and a load worked by hand.

use crate::{
    estimate::{Realisation, forces::Group},
    joint::{Joint, Tightening, read},
    preload,
};

const BOLT: &str = r#"
    [service]
    medium = "vacuum"
    temperature = { hot = "60 °C", cold = "-20 °C", assembly = "20 °C" }
    [[plate]]
    material = "Al 6061-T6"
    thickness = "6 mm"
    size = ["40 mm", "40 mm"]
    finish = "milled"
    [[plate]]
    material = "Al 6061-T6"
    thickness = "6 mm"
    size = ["40 mm", "40 mm"]
    finish = "milled"
    [losses]
    settling = "0 µm"
    relaxation = "0 %"
    interaction = "0 %"
    [fastener]
    thread = "M5"
    grade = "8.8"
    head = "socket"
    torque = { value = "4 N·m", tolerance = "0 %" }
    friction = { thread = 0.12, head = 0.12 }
    scatter = "20 %"
    at = ["20 mm", "20 mm"]
    "#;

fn joint(further: &str) -> Joint {
    read(&format!("{BOLT}{further}")).unwrap_or_else(|faults| panic!("{faults:?}"))
}

fn group(joint: &Joint) -> Group {
    Group::new(joint, &joint.fasteners[0]).expect("a group of this file")
}

fn at(joint: &Joint, torque: f64) -> Joint {
    let mut changed = joint.clone();
    if let Tightening::Torque(tightening) = &mut changed.fasteners[0].tightening {
        tightening.torque = torque;
    }
    changed
}

#[test]
fn separation_stands_where_the_least_clamp_meets_the_load_with_its_factor() {
    let joint = joint("axial_load = { value = \"1 kN\", introduction = 0.0, safety = 1.5 }");
    let group = group(&joint);
    let torque = group
        .least_torque(&joint, &joint.fasteners[0])
        .expect("a load asks for force");
    // By hand: n = 0 puts the whole load on the faces, so that the least clamp must be 1500 N. It is
    // 0.8 F in the cold case, less what aluminium contracts over steel (a fixed force).
    let there = at(&joint, torque);
    let clamp = group.clamp(&joint, &there.fasteners[0], 1);
    assert!((clamp.low / 1500.0 - 1.0).abs() < 1e-6, "{clamp:?}");
    let warm = group.clamp(&joint, &there.fasteners[0], 0);
    assert!(warm.low > clamp.low);
    // Brute force: the first of 4000 torques whose clamp holds.
    let step = 1e-3;
    let first = (1..4000)
        .map(|index| f64::from(index) * step)
        .find(|torque| group.margin(&joint, &at(&joint, *torque).fasteners[0]) >= 0.0)
        .expect("some torque holds");
    assert!((torque..torque + step).contains(&first), "{torque} {first}");
}

#[test]
fn without_load_or_loss_any_torque_keeps_the_faces_together() {
    let mut joint = joint("");
    joint.service.cases.truncate(1);
    let group = group(&joint);
    // The hot case presses the plates harder: no torque is too small.
    assert_eq!(group.least_torque(&joint, &joint.fasteners[0]), None);
}

#[test]
fn limits_in_service_stand_exactly_where_their_torques_say() {
    let joint = joint("axial_load = { value = \"4 kN\", introduction = 1.0, safety = 1.0 }");
    let group = group(&joint);
    let torques = group.most_torques(&joint, &joint.fasteners[0]);
    for name in [
        preload::limits::IN_SERVICE,
        preload::limits::PROOF_IN_SERVICE,
    ] {
        let (_, torque) = torques
            .iter()
            .find(|(each, _)| *each == name)
            .expect("a limit of this bolt");
        let there = at(&joint, *torque);
        let limits = group.in_service(&joint, &there.fasteners[0]);
        let limit = limits.iter().find(|limit| limit.name == name).unwrap();
        // The root of the same function: 1e-10 of the torque.
        assert!((limit.used - 1.0).abs() < 1e-8, "{name}: {}", limit.used);
    }
    assert!(torques.windows(2).all(|pair| pair[0].1 <= pair[1].1));
}

// The service force at that torque is the bolt's own, by `most_in_service`; 1e-8 as above.
#[test]
fn an_insert_is_held_against_the_force_in_service() {
    let text = format!(
        "{BOLT}engagement = {{ kind = \"insert\", length = \"6 mm\", pull_out = \"6 kN\" }}\n\
         axial_load = {{ value = \"4 kN\", introduction = 1.0, safety = 1.0 }}"
    );
    let joint = read(&text).unwrap_or_else(|faults| panic!("{faults:?}"));
    let group = group(&joint);
    let bolt = &joint.fasteners[0];
    let (torque, name) = group
        .largest_torque(&joint, bolt)
        .expect("some torque holds");
    assert_eq!(name, "pull-out of the insert in service");
    let there = at(&joint, torque);
    let force = group.most_in_service(&joint, &there.fasteners[0]);
    assert!((force / 6000.0 - 1.0).abs() < 1e-8, "{force}");
    // At assembly alone the insert would bear more.
    let torques = group.most_torques(&joint, bolt);
    let of = |wanted: &str| {
        torques
            .iter()
            .find(|(name, _)| *name == wanted)
            .map(|found| found.1)
    };
    assert!(of(preload::limits::PULL_OUT).is_some_and(|alone| alone > torque));
    // Above it the bolt fails in service, although it holds at assembly.
    let above = at(&joint, 1.01 * torque);
    let strength = group.strength(&joint, &above.fasteners[0]);
    assert!(!strength.passes);
}

#[test]
fn a_large_load_lowers_the_largest_torque() {
    let plain = joint("");
    let most = |joint: &Joint| {
        group(joint)
            .largest_torque(joint, &joint.fasteners[0])
            .expect("a yield strength is known")
    };
    let (free, _) = most(&plain);
    // 8.8 M5: proof 8.2 kN. Of a load under the heads the bolt takes a quarter or so: a small one lies within
    // what torsion leaves it in service, a larger one costs torque, and one of 60 kN leaves none.
    let pulled = |load: &str| {
        joint(&format!(
            "axial_load = {{ value = \"{load}\", introduction = 1.0, safety = 1.0 }}"
        ))
    };
    let mut last = free;
    let mut lowered = 0;
    for load in 1..=30 {
        let loaded = pulled(&format!("{load} kN"));
        let Some((torque, name)) = group(&loaded).largest_torque(&loaded, &loaded.fasteners[0])
        else {
            break;
        };
        assert!(torque <= last, "{load} kN: {torque} {last}");
        if torque < last {
            lowered += 1;
            let own = [
                preload::limits::IN_SERVICE,
                preload::limits::PROOF_IN_SERVICE,
            ];
            let again = preload::limits::at_assembly(name).is_some();
            assert!(own.contains(&name) || again, "{load} kN: {name}");
        }
        last = torque;
    }
    assert!(lowered >= 2, "{lowered}");
    let torn = pulled("60 kN");
    assert_eq!(group(&torn).largest_torque(&torn, &torn.fasteners[0]), None);
}

#[test]
fn disc_springs_keep_the_force_that_the_cold_takes() {
    // Aluminium contracts over steel by some 1e-5/K · 40 K · 12 mm = 5 µm; four sets of one disc give
    // about a micrometre per newton.
    let springs = "disc_springs = { outer = \"10 mm\", inner = \"5.2 mm\", thickness = \"0.5 mm\", \
                   cone_height = \"0.25 mm\", parallel = 6, series = 4 }";
    let kept = |further: &str| {
        let joint = at(&joint(further), 1.6);
        let group = group(&joint);
        let assembly = preload::force_band(&joint.fasteners[0]).nominal;
        group.clamp(&joint, &joint.fasteners[0], 1).nominal / assembly
    };
    let (stiff, sprung) = (kept(""), kept(springs));
    assert!(stiff < 0.7, "{stiff}");
    assert!(sprung > 0.97, "{sprung}");
}

#[test]
fn bolts_tightened_later_cost_the_judged_share() {
    let two = BOLT
        .replace(
            "at = [\"20 mm\", \"20 mm\"]",
            "at = [[\"10 mm\", \"20 mm\"], [\"30 mm\", \"20 mm\"]]",
        )
        .replace("    interaction = \"0 %\"\n", "");
    let alone = BOLT.replace("    interaction = \"0 %\"\n", "");
    for (text, share) in [(two, 0.05), (alone, 0.0)] {
        let joint = read(&text).expect("the joint is whole");
        let losses = group(&joint).losses(&joint, 0, &Realisation::default());
        assert!((losses.interaction - share).abs() < 1e-12);
    }
}
