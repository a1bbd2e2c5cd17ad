//! The joint in plan and cut, and the drawing of evidence: complete, to scale, refused where they lie.

use ringsum::{
    estimate::{StackOutline, stack_outline},
    figures::{
        CutBolt, CutEnd, CutHead, Drawing, EvidenceAxis, EvidencePanel, EvidencePlot, EvidenceRow,
        FigureError, JointCut, JointPlot, PlanMap, svg,
    },
    joint::{self, Joint},
};

fn demo(name: &str) -> Joint {
    let text = std::fs::read_to_string(format!("joints/{name}.toml")).expect("a demo joint");
    joint::read(&text).unwrap_or_else(|faults| panic!("{faults:#?}"))
}

#[test]
fn a_cut_stacks_the_plates_and_leaves_the_holes_open() {
    let joint = demo("converter_box");
    let cut = stack_outline(&joint).expect("bolts to cut through");
    // Three bolts stand in the lower row; the file says where.
    let along: Vec<f64> = cut.bolts.iter().map(|bolt| bolt.along).collect();
    assert_eq!(along, [0.010, 0.080, 0.150]);
    let near = |one: f64, other: f64| assert!((one - other).abs() < 1e-8, "{one} {other}");
    // Panel of 4 mm below, base of 5 mm on it.
    near(cut.plates[1].heights[0], 0.0);
    near(cut.plates[1].heights[1], 0.004);
    near(cut.plates[0].heights[0], 0.004);
    near(cut.plates[0].heights[1], 0.009);
    // Three holes of 5.5 mm part the base into four pieces of 160 mm less the holes.
    for (plate, length) in cut.plates.iter().zip([0.160, 0.200]) {
        assert_eq!(plate.solid.len(), 4, "{}", plate.name);
        let solid: f64 = plate
            .solid
            .iter()
            .map(|part| part.along[1] - part.along[0])
            .sum();
        // Edges are found to a millionth of the cut.
        assert!((solid - (length - 3.0 * 0.0055)).abs() < 1e-6, "{solid}");
    }
    // The heated zone is 150 mm long.
    near(cut.heated[0][1] - cut.heated[0][0], 0.150);
}

#[test]
fn feet_and_ribs_stand_where_they_belong() {
    let joint = demo("bracket_feet");
    let cut = stack_outline(&joint).expect("bolts to cut through");
    let [warm, cold] = &cut.plates[..] else {
        panic!("two plates")
    };
    // The faces meet, and nothing of one plate lies in the other.
    assert!((warm.heights[0] - cold.heights[1]).abs() < 1e-12);
    for plate in &cut.plates {
        for part in &plate.solid {
            let [low, high] = part.heights;
            assert!(plate.heights[0] <= low + 1e-12 && high <= plate.heights[1] + 1e-12);
        }
    }
    // Feet reach the face between the plates.
    let lowest = warm
        .solid
        .iter()
        .map(|part| part.heights[0])
        .fold(f64::INFINITY, f64::min);
    assert!((lowest - warm.heights[0]).abs() < 1e-12, "{lowest}");
}

fn plot(stack: StackOutline) -> JointPlot {
    JointPlot {
        told: "two plates".to_owned(),
        plan: PlanMap::without_field("Lid & box", [-0.02, -0.02, 0.18, 0.13]),
        cut: Some(JointCut {
            labels: vec!["base <1>".to_owned(), "panel".to_owned()],
            bolts: stack
                .bolts
                .iter()
                .map(|bolt| CutBolt {
                    along: bolt.along,
                    diameter: 0.005,
                    seat_radius: bolt.head_radius,
                    washers: 0.002,
                    faces: [0.0, 0.009],
                    head_on_top: true,
                    head: CutHead::Cylinder,
                    end: CutEnd::Nut { washer: true },
                })
                .collect(),
            stack,
        }),
    }
}

#[test]
fn plan_and_cut_are_drawn_with_their_words_and_not_from_nonsense() {
    let stack = stack_outline(&demo("converter_box")).expect("a cut");
    let drawn = svg(&Drawing::Joint(Box::new(plot(stack.clone())))).expect("a drawing");
    for words in [
        "Lid &amp; box",
        "A – A",
        "true to scale",
        "base &lt;1&gt;",
        "cut plate",
        "x, mm",
    ] {
        assert!(drawn.contains(words), "no {words}");
    }
    assert!(!drawn.contains("NaN"));
    let mut wrong = plot(stack);
    if let Some(cut) = &mut wrong.cut {
        cut.stack.plates[0].heights[1] = f64::NAN;
    }
    assert_eq!(
        svg(&Drawing::Joint(Box::new(wrong))),
        Err(FigureError::NotFinite("the cut"))
    );
}

/// Plan and cut of a demo joint.
pub fn drawing() -> Drawing {
    let stack = stack_outline(&demo("converter_box")).expect("a cut");
    Drawing::Joint(Box::new(plot(stack)))
}

/// A check that expects one.
pub fn check(name: &str, found: f64) -> EvidenceRow {
    EvidenceRow {
        name: name.to_owned(),
        values: format!("{found} against 1 K/W"),
        accepted: [0.5, 2.0],
        band: Some([0.8 * found, 1.2 * found]),
        found: vec![found],
    }
}

/// Checks on one axis.
pub fn evidence(rows: Vec<EvidenceRow>) -> Drawing {
    Drawing::Evidence(Box::new(EvidencePlot {
        title: "Evidence".to_owned(),
        told: "two checks".to_owned(),
        panels: vec![EvidencePanel {
            axis: EvidenceAxis::Ratio,
            name: "measured".to_owned(),
            rows,
        }],
    }))
}

#[test]
fn evidence_shows_misses_as_such() {
    let rows = vec![check("inside", 1.1), check("outside", 3.0)];
    let both = svg(&evidence(rows)).expect("a drawing");
    assert_eq!(both.matches(", miss").count(), 1);
    assert!(both.contains("3 against 1 K/W, miss") && both.contains("found over expected"));
    let wrong = svg(&evidence(vec![check("nothing", f64::NAN)]));
    assert_eq!(wrong, Err(FigureError::NotFinite("the evidence")));
    assert_eq!(
        svg(&evidence(Vec::new())),
        Err(FigureError::Empty("the evidence"))
    );
}
