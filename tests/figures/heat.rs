//! Figures of a solved heat: both faces, the flux between them, a section, a minimum of the torque.

use ringsum::{
    estimate::{HeatMap, Minimum, SectionBolt, SectionPlate, Solid, StackSection, Through},
    figures::{Drawing, FacePair, FigureError, PlanMap, SectionPlot, svg},
    joint::Limit,
    resistance::columns::{Across, Section},
};

use crate::{furnished, holds, solved, sweep, texts};

/// Heat of the same field: warm above, most flux where it presses.
fn heat_map() -> HeatMap {
    let field = solved();
    let warm: Vec<f64> = field.pressure.iter().map(|p| 0.3 - 0.02e-6 * p).collect();
    HeatMap {
        window: field.window,
        size: field.size,
        rises: [warm.clone(), warm.iter().map(|rise| 0.3 - rise).collect()],
        flux: field.pressure.iter().map(|p| 30.0 + 1e-4 * p).collect(),
        concentration: field.pressure.iter().map(|p| 0.3 + 1e-6 * p).collect(),
    }
}

pub fn flux() -> Drawing {
    let map = PlanMap::flux("Box on panel", (&solved(), &heat_map()));
    Drawing::Plan(Box::new(furnished(map)))
}

pub fn faces(heat: Option<f64>) -> FacePair {
    let parts = (&solved(), &heat_map());
    FacePair::of("Box on panel", parts, (["base plate", "panel"], heat)).furnished(furnished)
}

/// Two plates of 4 mm about two bolts; the upper one hangs over neither.
pub fn section(heat: Option<f64>) -> SectionPlot {
    let lines: Vec<f64> = (0..=20).map(|k| 3e-3 * f64::from(k)).collect();
    let holes = [0.015, 0.045];
    let plate = |name: &str, foot: f64, rise: f64| SectionPlate {
        name: name.into(),
        solid: [[0.0, 0.0128], [0.0172, 0.0428], [0.0472, 0.06]]
            .map(|along| Solid {
                along,
                heights: [foot, foot + 4e-3],
            })
            .to_vec(),
        section: Section {
            along: lines.clone(),
            heights: [0.0, 2e-3, 4e-3].map(|height| foot + height).to_vec(),
            rise: lines
                .iter()
                .map(|along| {
                    let near = holes.iter().any(|hole| (hole - along).abs() < 2e-3);
                    [0.0, 0.01, 0.02]
                        .map(|more| (!near).then_some(rise + more))
                        .to_vec()
                })
                .collect(),
        },
    };
    let through = |name: &str, along: f64, jump: f64| Through {
        name: name.into(),
        along,
        plates: vec![
            vec![[4e-3, 0.1 + jump], [8e-3, 0.12 + jump]],
            vec![[0.0, 0.08], [4e-3, 0.1]],
        ],
    };
    SectionPlot {
        title: "Box on panel".into(),
        section: StackSection {
            across: Across::X(0.012),
            plates: vec![plate("base plate", 4e-3, 0.2), plate("panel", 0.0, 0.0)],
            bolts: holes
                .iter()
                .zip(1..)
                .map(|(along, number)| SectionBolt {
                    number,
                    along: *along,
                    head_radius: 4e-3,
                    hole_radius: 2.2e-3,
                })
                .collect(),
            heated: vec![[0.02, 0.04]],
            touching: vec![[0.01, 0.0128], [0.0172, 0.02]],
            through: vec![
                through("beside bolt 1", 0.018, 0.012),
                through("between bolts 1 and 2", 0.03, 0.15),
            ],
        },
        heat,
    }
}

#[test]
fn both_faces_stand_on_one_scale_and_say_at_which_heat() {
    let document = svg(&Drawing::Faces(Box::new(faces(Some(22.0))))).unwrap();
    let texts_of = texts(&document);
    for part in [
        "temperature above the mean sink surface at 22\u{a0}W, 0 to 6.60 K",
        "face of base plate, K",
        "face of panel, K",
        "hole",
        "edge of contact",
        "heated zone",
    ] {
        assert!(holds(&texts_of, part), "{part} is missing in {texts_of:?}");
    }
    assert_eq!(document.matches("data:image/png;base64,").count(), 4);
    // One scale: every label of one bar stands on the other too.
    let six = texts_of.iter().filter(|text| *text == "6").count();
    assert_eq!(six, 2, "{texts_of:?}");
    let texts_of = texts(&svg(&Drawing::Faces(Box::new(faces(None)))).unwrap());
    for part in ["surface per watt, 0 to 0.300 K/W", "face of panel, K/W"] {
        assert!(holds(&texts_of, part), "{part} is missing in {texts_of:?}");
    }
}

#[test]
fn a_flux_map_is_told_in_multiples_of_its_mean() {
    let texts = texts(&svg(&flux()).unwrap());
    assert!(holds(&texts, "heat flux across the faces, × its mean"));
    assert!(holds(&texts, "heat flux across the faces, at most 5."));
}

#[test]
fn a_section_shows_colours_bolts_contact_and_the_jump_at_two_places() {
    let document = svg(&Drawing::Section(Box::new(section(Some(10.0))))).unwrap();
    let found = texts(&document);
    for part in [
        "base plate on panel; temperature above the mean sink surface at 10\u{a0}W",
        "temperature, K",
        "height, mm",
        "x, mm, at y = 12 mm; heights drawn 3 ×",
        "faces touch",
        "heated zone",
        "axis of a bolt",
        // The fixture jumps by 0.012 and 0.15 K/W.
        "beside bolt 1: 0.120 K across the faces",
        "between bolts 1 and 2: 1.50 K across the faces",
    ] {
        assert!(holds(&found, part), "{part} is missing in {found:?}");
    }
    // The cut and its bar.
    assert_eq!(document.matches("data:image/png;base64,").count(), 2);
    let found = texts(&svg(&Drawing::Section(Box::new(section(None)))).unwrap());
    assert!(
        holds(&found, "between bolts 1 and 2: 0.150 K/W"),
        "{found:?}"
    );
}

#[test]
fn a_section_without_anything_solid_or_finite_is_an_error() {
    let with = |change: &dyn Fn(&mut SectionPlot)| {
        let mut plot = section(None);
        change(&mut plot);
        svg(&Drawing::Section(Box::new(plot)))
    };
    let plates = |plot: &mut SectionPlot, change: &dyn Fn(&mut SectionPlate)| {
        plot.section.plates.iter_mut().for_each(change);
    };
    assert_eq!(
        with(&|plot| plates(plot, &|plate| plate.solid.clear())),
        Err(FigureError::Empty("the section"))
    );
    assert_eq!(
        with(&|plot| plates(plot, &|plate| plate.section.rise.clear())),
        Err(FigureError::Empty("the temperatures"))
    );
    assert_eq!(
        with(&|plot| plates(plot, &|plate| plate.section.rise[0][0] = Some(f64::NAN))),
        Err(FigureError::NotFinite("the temperatures"))
    );
    assert_eq!(
        with(&|plot| plates(plot, &|plate| plate.solid[0].along[0] = f64::INFINITY)),
        Err(FigureError::NotFinite("the section"))
    );
    // Without a place worth a profile the cut stands alone.
    assert!(with(&|plot| plot.section.through.clear()).is_ok());
}

#[test]
fn a_minimum_between_swept_torques_is_marked_where_it_lies() {
    let mut swept = sweep();
    swept.best = Some(1.6);
    swept.minimum = Some(Minimum {
        torque: 1.6,
        source_to_sink: 0.41,
        added_by_joint: 0.01,
    });
    let texts = texts(&svg(&Drawing::Torque(Box::new(swept))).unwrap());
    assert!(holds(&texts, "minimum, at 1.6 N·m"), "{texts:?}");
    assert!(holds(&texts, "best 1.6 N·m, worse beyond"), "{texts:?}");
}

#[test]
fn a_joint_that_is_to_resist_is_marked_where_it_resists_most() {
    let mut mount = sweep();
    mount.best = Some(0.25);
    mount.required = Some((0.8, Limit::Least));
    let texts = texts(&svg(&Drawing::Torque(Box::new(mount))).unwrap());
    let named = "highest that strength allows, at 0.25 N·m";
    assert!(holds(&texts, named), "{texts:?}");
}
