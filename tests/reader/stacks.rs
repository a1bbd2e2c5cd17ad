//! Stacks of more than two plates: places, faces, fillers, holes, names.

use ringsum::joint::{Facing, FillerKind};

use crate::{at, near, plain, read, read_with};

/// The plain joint with a shim between its plates.
fn stack(shim: &str, rest: &str) -> String {
    let shim = format!(
        "[[plate]]\nname = \"shim\"\nmaterial = \"304\"\nthickness = \"1 mm\"\n\
         size = [\"76 mm\", \"58 mm\"]\noffset = [\"-2 mm\", \"-1 mm\"]\n{shim}\n\n"
    );
    let text = plain();
    let second = text
        .match_indices("[[plate]]")
        .nth(1)
        .expect("two plates")
        .0;
    format!("{}{shim}{}\n{rest}", &text[..second], &text[second..])
}

const MILLED: &str = "finish = \"milled\"";

#[test]
fn offsets_add_from_plate_to_plate() {
    let text = stack(MILLED, "");
    let last = text
        .match_indices("name = \"panel\"")
        .next()
        .map(|(at, _)| at);
    let last = last.expect("the second plate is called panel");
    let text = format!(
        "{}offset = [\"2 mm\", \"1 mm\"]\n{}",
        &text[..last],
        &text[last..]
    );
    let joint = read(&text);
    assert!(at(joint.plates[1].origin, [2e-3, 1e-3]));
    assert!(at(joint.plates[2].origin, [0.0, 0.0]));
    assert_eq!(joint.interfaces(), 2);
    assert_eq!(joint.interface_name(1), "shim / panel");
}

#[test]
fn a_plate_between_may_have_two_finishes() {
    let two = "finish = { roughness = \"Rq 1 µm\", flatness = \"5 µm\" }\n\
               finish_below = { roughness = \"Rq 3 µm\", plating = \"hard anodize\" }";
    let joint = read(&stack(two, ""));
    let shim = &joint.plates[1];
    assert!(near(shim.face(Facing::Warm).roughness.nominal, 1e-6));
    assert!(near(shim.face(Facing::Cold).roughness.nominal, 3e-6));
    assert!(near(joint.loose_flatness(0), 5e-6) && joint.loose_flatness(1) <= 0.0);
    // Bare steel above, an oxide film below.
    assert!(near(joint.contact.emissivity[0][1], 0.1));
    assert!(near(joint.contact.emissivity[1][0], 0.8));
    let one = read(&stack(MILLED, ""));
    let shim = &one.plates[1];
    assert_eq!(shim.face(Facing::Warm), shim.face(Facing::Cold));
}

#[test]
fn each_interface_has_its_own_filler() {
    let foil = "[[filler]]\nname = \"graphite foil\"\nbetween = [\"panel\", \"shim\"]\n";
    let grease = "[[filler]]\nname = \"filled grease\"\nbetween = [\"box\", \"shim\"]\n";
    let joint = read(&stack(MILLED, foil));
    assert!(joint.filler(0).is_none() && joint.is_bare(0));
    assert!(
        joint
            .filler(1)
            .is_some_and(|filler| filler.name == "graphite foil")
    );
    let both = read(&stack(MILLED, &format!("{foil}{grease}")));
    let kind = |interface: usize| both.filler(interface).map(|filler| filler.kind.clone());
    assert!(matches!(kind(0), Some(FillerKind::Paste { .. })));
    assert!(both.is_layered(1) && !both.is_bare(1));
}

#[test]
fn a_filler_by_name_alone_still_stands_for_the_table() {
    let text = format!("filler = \"indium foil\"\n{}", plain());
    let joint = read(&text);
    assert!(
        joint
            .filler(0)
            .is_some_and(|filler| filler.name == "indium foil")
    );
    for set in [
        "filler=\"indium foil\"",
        "filler.name=indium foil",
        "filler[1].name=indium foil",
    ] {
        let text = format!("{}\n[filler]\nname = \"graphite foil\"\n", plain());
        let joint = read_with(&text, &[set]);
        let filler = joint.filler(0).expect("a filler");
        assert_eq!(filler.name, "indium foil", "{set}");
    }
    let absent = read_with(&plain(), &["filler.name=indium foil"]);
    assert!(absent.filler(0).is_some());
}

#[test]
fn holes_follow_the_plates() {
    let hole = |value: &str| {
        let text = stack(MILLED, "").replace("head = ", &format!("hole = {value}\nhead = "));
        read(&text).fasteners[0].hole_radius.clone()
    };
    let close = |found: &[f64], diameters: [f64; 3]| {
        found.len() == 3
            && found
                .iter()
                .zip(diameters)
                .all(|(one, other)| near(2.0 * one, other))
    };
    assert!(close(&hole("\"4.4 mm\""), [4.4e-3; 3]));
    assert!(close(
        &hole("[\"4.4 mm\", \"4.8 mm\", \"4.6 mm\"]"),
        [4.4e-3, 4.8e-3, 4.6e-3]
    ));
    let named = hole("{ shim = \"5 mm\" }");
    assert!(close(&named, [4.5e-3, 5e-3, 4.5e-3]), "{named:?}");
}

#[test]
fn unnamed_plates_of_a_stack_are_counted() {
    let text = stack(MILLED, "")
        .replace("name = \"box\"\n", "")
        .replace("name = \"shim\"\n", "")
        .replace("name = \"panel\"\n", "");
    let names: Vec<String> = read(&text)
        .plates
        .into_iter()
        .map(|plate| plate.name)
        .collect();
    assert_eq!(names, ["first", "second", "third"]);
    let joint = read_with(&text, &["plate.second.thickness=2 mm"]);
    assert!(near(joint.plates[1].thickness, 2e-3));
}

#[test]
fn a_stack_is_beyond_the_cone() {
    let joint = read(&stack(MILLED, ""));
    let needs = joint.needs_elastic();
    assert!(needs.len() == 1 && needs[0].0 == "plate", "{needs:?}");
}
