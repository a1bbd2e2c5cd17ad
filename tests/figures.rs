//! Figures as files: well formed, complete, repeatable, and errors instead of panics.

#[path = "figures/arrange.rs"]
mod arrange;
#[path = "figures/comparison.rs"]
mod comparison;
#[path = "figures/heat.rs"]
mod heat;
#[path = "figures/joint.rs"]
mod joint;
#[path = "figures/tornado.rs"]
mod tornado;
#[path = "figures/units.rs"]
mod units;

use std::fmt::Write;

use ringsum::{
    estimate::{
        Band, End, FieldMap, Range, Side, TorqueLimit, TorquePoint, TorqueSweep, TorqueWindow,
    },
    figures::{
        CumulativePlot, Curve, DetailKind, Drawing, FigureError, FitPlot, Format, PlanBolt,
        PlanDetail, PlanMap, PlanOutline, PlanPair, PlanShape, RadiusMark, png, render, svg,
    },
    fit::{Readings, Series, series::Form},
    joint::Limit,
};

const HOSTILE: &str =
    "<script>alert(1)</script> & \"quoted\" 'joint' ]]> \u{0}\u{7}\u{FFFE} ü 漢 \u{1F529}";

fn field() -> FieldMap {
    let pressure: Vec<f64> = (0..24 * 16)
        .map(|k| match k {
            100 => f64::NAN,
            _ => 1e6 * f64::from(k % 24),
        })
        .collect();
    FieldMap {
        window: [0.0, 0.0, 0.06, 0.04],
        size: [24, 16],
        conductance: pressure.iter().map(|p| p / 1e3).collect(),
        gap: None,
        pressure,
    }
}

fn furnished(mut map: PlanMap) -> PlanMap {
    map.outlines = vec![
        PlanOutline {
            name: "base plate".into(),
            shape: PlanShape::Rectangle {
                corner: [0.005, 0.005],
                size: [0.05, 0.03],
            },
        },
        PlanOutline {
            name: "panel".into(),
            shape: PlanShape::Disc {
                centre: [0.03, 0.02],
                radius: 0.02,
            },
        },
    ];
    map.bolts = [[0.012, 0.012], [0.048, 0.012], [0.03, 0.03]]
        .map(|at| PlanBolt {
            at,
            hole_radius: 2.2e-3,
            head_radius: 4e-3,
            contact_radius: Some(7e-3),
        })
        .to_vec();
    map.heated = vec![PlanShape::Polygon(vec![
        [0.02, 0.01],
        [0.04, 0.01],
        [0.03, 0.03],
    ])];
    map
}

/// A solved field: pressed around four places, open between them, a corner off the faces.
fn solved() -> FieldMap {
    let size = [60, 40];
    let [mut pressure, mut gap] = [Vec::new(), Vec::new()];
    for k in 0..size[0] * size[1] {
        let [x, y] = [(k % 60) as f64 + 0.5, (k / 60) as f64 + 0.5];
        let away = (x - 30.0).abs() - 18.0;
        let radius = away.hypot((y - 20.0).abs() - 10.0);
        let nothing = x < 6.0 && y < 6.0;
        let or_nothing = |value: f64| if nothing { f64::NAN } else { value };
        pressure.push(or_nothing(2e6 * (7.0 - radius).max(0.0).sqrt()));
        gap.push(or_nothing(0.2e-6 * (radius - 7.0).max(0.0).powf(1.5)));
    }
    FieldMap {
        window: [0.0, 0.0, 0.06, 0.04],
        size,
        conductance: pressure.iter().map(|p| p / 1e3 + 50.0).collect(),
        gap: Some(gap),
        pressure,
    }
}

/// The pair of a box with an angled plate, a cut-out, a foot and a rib.
fn pair() -> PlanPair {
    PlanPair::of("Box on panel", &solved())
        .expect("a solved field knows its gap")
        .furnished(|map| {
            let mut map = furnished(map);
            map.outlines[0].shape = PlanShape::Polygon(vec![
                [0.006, 0.006],
                [0.056, 0.006],
                [0.056, 0.026],
                [0.046, 0.036],
                [0.006, 0.036],
            ]);
            for bolt in &mut map.bolts {
                bolt.contact_radius = None;
            }
            map.details = [
                (DetailKind::CutOut, [0.028, 0.017]),
                (DetailKind::Foot, [0.010, 0.010]),
                (DetailKind::Rib, [0.030, 0.010]),
            ]
            .map(|(kind, corner)| PlanDetail {
                kind,
                shape: PlanShape::Rectangle {
                    corner,
                    size: [0.006, 0.006],
                },
            })
            .to_vec();
            map
        })
}

fn cumulative(curves: usize) -> CumulativePlot {
    CumulativePlot {
        title: "Round pair".into(),
        curves: (1..=curves)
            .map(|k| Curve {
                label: format!("bolt {k}"),
                points: (0..20)
                    .map(|r| (1e-3 * f64::from(r + 2), k as f64 * f64::from(r)))
                    .collect(),
            })
            .collect(),
        marks: vec![RadiusMark {
            name: "edge of contact".into(),
            radius: 9e-3,
        }],
    }
}

fn sweep() -> TorqueSweep {
    let band = |nominal: f64| Band {
        low: Some(0.8 * nominal),
        nominal,
        high: Some(1.3 * nominal),
    };
    TorqueSweep {
        title: "Converter box".into(),
        group: "M4 socket, 6 places".into(),
        case: "service",
        field: "elastic",
        resolution: "normal",
        stated: 2.2,
        largest: Some((2.9, "yield of the bolt")),
        best: Some(2.8),
        at_stated: 0.165,
        at_limit: None,
        bends: false,
        minimum: None,
        points: (1..=16)
            .map(|k| {
                let torque = f64::from(k) / 4.0;
                TorquePoint {
                    torque,
                    force: band(1000.0 * torque),
                    source_to_sink: band(0.4 + 0.3 / torque),
                    contact: band(0.3 / torque),
                    added_by_joint: band(0.3 / torque),
                    strength_use: None,
                    passes: torque < 2.9,
                }
            })
            .collect(),
        required: Some((0.8, Limit::Most)),
        window: TorqueWindow {
            confidence: Some(0.9),
            knee: Some(1.4),
            limits: vec![
                TorqueLimit {
                    name: "separation",
                    torque: 0.6,
                    side: Side::Least,
                },
                TorqueLimit {
                    name: "yield of the bolt",
                    torque: 2.9,
                    side: Side::Most,
                },
                TorqueLimit {
                    name: "proof load",
                    torque: 3.6,
                    side: Side::Most,
                },
            ],
            strength: None,
            heat: Some(Vec::new()),
            both: Some(Range {
                low: End {
                    torque: 1.1,
                    by: "the requirement",
                },
                high: End {
                    torque: 2.9,
                    by: "yield of the bolt",
                },
            }),
            trusted: true,
            plates_fail: false,
            force_ratio: None,
            larger_thread: None,
            trials: Vec::new(),
        },
        cautions: Vec::new(),
    }
}

/// Readings with a law, bands, error bars, two branches and one that stands apart.
fn fitted() -> FitPlot {
    let mut text = String::from("p [MPa], h [W/(m²·K)], sigma [%], direction\n");
    for at in 1..9 {
        let apart = if at == 5 { 1.9 } else { 1.0 };
        for (direction, exponent) in [("loading", 0.9), ("unloading", 0.6)] {
            let h =
                9000.0 * apart * f64::from(at).powf(exponent) * (1.0 + 0.01 * f64::from(at % 3));
            writeln!(text, "{at}, {h}, 2, {direction}").expect("a text takes it");
        }
    }
    let readings = Readings::read(&text).expect("a table");
    FitPlot {
        title: "Rig".into(),
        series: Series::of(&readings, Form::Law).expect("two laws"),
    }
}

fn every_drawing() -> Vec<Drawing> {
    vec![
        Drawing::Plan(Box::new(furnished(PlanMap::pressure(
            "Box on panel",
            &field(),
        )))),
        Drawing::Plan(Box::new(furnished(PlanMap::conductance(
            "Box on panel",
            &field(),
        )))),
        Drawing::Cumulative(cumulative(1)),
        Drawing::Cumulative(cumulative(5)),
        Drawing::Torque(Box::new(sweep())),
        Drawing::Fit(Box::new(fitted())),
        Drawing::PressureAndGap(Box::new(pair())),
        Drawing::Plan(Box::new(furnished(
            PlanMap::gap("Box on panel", &solved()).expect("a solved field knows its gap"),
        ))),
        arrange::drawing(),
        heat::flux(),
        Drawing::Faces(Box::new(heat::faces(Some(22.0)))),
        Drawing::Section(Box::new(heat::section(Some(22.0)))),
        Drawing::Comparison(Box::new(comparison::comparison())),
        Drawing::Tornado(Box::new(tornado::ranking())),
        joint::drawing(),
        joint::evidence(vec![
            joint::check("inside", 1.1),
            joint::check("outside", 3.0),
        ]),
    ]
}

/// Content of every text element, in order; panics where tags or quotes do not balance.
fn texts(document: &str) -> Vec<String> {
    let mut open: Vec<&str> = Vec::new();
    let mut found = Vec::new();
    let mut rest = document;
    while let Some(start) = rest.find('<') {
        let content = rest[..start].trim();
        assert!(!content.contains('>'), "a bare > in {content:?}");
        if open.last() == Some(&"text") {
            found.push(content.to_owned());
        }
        let end = start + rest[start..].find('>').expect("every tag closes");
        let tag = &rest[start + 1..end];
        assert_eq!(tag.matches('"').count() % 2, 0, "quotes of {tag:?}");
        if let Some(name) = tag.strip_prefix('/') {
            assert_eq!(open.pop(), Some(name));
        } else if !tag.ends_with('/') {
            open.push(tag.split(' ').next().unwrap_or_default());
        }
        rest = &rest[end + 1..];
    }
    assert!(open.is_empty(), "{open:?} stay open");
    found
}

fn holds(texts: &[String], part: &str) -> bool {
    texts.iter().any(|text| text.contains(part))
}

/// Width, height and whether the pixels are of more than one colour.
fn decoded(bytes: &[u8]) -> (u32, u32, bool) {
    let mut reader = png::Decoder::new(std::io::Cursor::new(bytes))
        .read_info()
        .expect("a PNG header");
    let mut pixels = vec![0; reader.output_buffer_size().expect("a size")];
    let info = reader.next_frame(&mut pixels).expect("a PNG image");
    let varied = pixels.iter().any(|value| *value != pixels[0]);
    (info.width, info.height, varied)
}

#[test]
fn a_pressure_map_is_complete() {
    let document = svg(&every_drawing()[0]).unwrap();
    let texts = texts(&document);
    for part in [
        "Box on panel",
        "contact pressure, MPa",
        "x, mm",
        "y, mm",
        "base plate",
        "panel",
        "hole",
        "head or washer",
        "edge of contact",
        "heated zone",
        "at most 23.0 MPa",
    ] {
        assert!(holds(&texts, part), "{part} is missing in {texts:?}");
    }
    // Every bolt of a group carries its number.
    for number in ["1", "2", "3"] {
        assert!(texts.iter().any(|text| text == number));
    }
    // The field and the bar of its colours.
    assert_eq!(document.matches("data:image/png;base64,").count(), 2);
    assert!(!document.contains("font-family=\"\""));
    assert!(document.contains("sans-serif"));
}

#[test]
fn a_conductance_map_names_its_unit_and_decades() {
    let texts = texts(&svg(&every_drawing()[1]).unwrap());
    assert!(holds(&texts, "local conductance, W/(m²·K)"));
    assert!(holds(&texts, "10\u{2009}000") && holds(&texts, "1000"));
    // The field holds zeros, which no logarithmic bar can show.
    assert!(holds(&texts, "below"));
}

#[test]
fn a_pair_shows_both_maps_with_bars_units_and_one_key() {
    let document = svg(&Drawing::PressureAndGap(Box::new(pair()))).unwrap();
    let texts = texts(&document);
    for part in [
        "contact pressure, MPa",
        "gap, µm",
        "contact pressure, at most 5.",
        "; gap, at most ",
        "x, mm",
        "y, mm",
        "base plate",
        "panel",
        "foot",
        "rib",
        "cut-out",
        "edge of contact",
        "heated zone",
        "no contact pressure",
        "faces touch",
        "no face on face",
    ] {
        assert!(holds(&texts, part), "{part} is missing in {texts:?}");
    }
    // Two fields and two bars, and every part is named once.
    assert_eq!(document.matches("data:image/png;base64,").count(), 4);
    for once in ["foot", "panel", "edge of contact", "heated zone", "y, mm"] {
        assert_eq!(
            texts.iter().filter(|text| *text == once).count(),
            1,
            "{once}"
        );
    }
}

/// Left and upper edge of every image, in the order of the document.
fn images(document: &str) -> Vec<[f64; 2]> {
    document
        .split("<image x=\"")
        .skip(1)
        .map(|part| {
            let (x, rest) = part.split_once("\" y=\"").expect("x stands before y");
            let (y, _) = rest.split_once('"').expect("y ends");
            [x, y].map(|edge| edge.parse().expect("an edge is a number"))
        })
        .collect()
}

#[test]
fn maps_stand_side_by_side_and_those_of_long_strips_one_above_the_other() {
    let wide = |width: f64| {
        let mut field = solved();
        field.window[2] = width;
        let pair = PlanPair::of("", &field).unwrap();
        // Bar and map of the pressure, bar and map of the gap.
        let places = images(&svg(&Drawing::PressureAndGap(Box::new(pair))).unwrap());
        let [_, pressure, _, gap] = places.as_slice() else {
            panic!("{places:?}");
        };
        [gap[0] > pressure[0], gap[1] > pressure[1]]
    };
    assert_eq!(wide(0.06), [true, false]);
    assert_eq!(wide(0.2), [false, true]);
}

#[test]
fn the_cone_has_no_gap_to_draw() {
    assert_eq!(PlanMap::gap("", &field()), None);
    assert_eq!(PlanPair::of("", &field()), None);
    // Its edge of contact is a circle at every bolt, that of a solved field a line of its own.
    assert!(PlanMap::pressure("", &field()).contact.is_empty());
    assert!(!PlanMap::pressure("", &solved()).contact.is_empty());
    assert!(!PlanMap::conductance("", &solved()).contact.is_empty());
}

#[test]
fn the_edge_of_contact_lies_where_pressure_ends() {
    let lines = PlanMap::pressure("", &solved()).contact;
    assert_eq!(lines.len(), 4, "a line around each of the four places");
    for [x, y] in lines.concat() {
        let radius = ((x - 0.03).abs() - 0.018).hypot((y - 0.02).abs() - 0.010);
        // The cells are 1 mm wide, and the smoothing adds less than a tenth of one.
        assert!((radius - 0.007).abs() < 0.7e-3, "{radius}");
    }
}

#[test]
fn one_curve_has_an_axis_of_shares_and_several_have_names() {
    let one = texts(&svg(&Drawing::Cumulative(cumulative(1))).unwrap());
    assert!(holds(&one, "share of the total, %") && holds(&one, "conductance, W/K"));
    assert!(holds(&one, "distance from the bolt axis, mm") && holds(&one, "edge of contact 9 mm"));
    let five = texts(&svg(&Drawing::Cumulative(cumulative(5))).unwrap());
    assert!(!holds(&five, "share of the total"));
    for k in 1..=5 {
        assert!(holds(&five, &format!("bolt {k}: ")));
    }
}

#[test]
fn a_sweep_shows_stated_largest_best_and_required() {
    let texts = texts(&svg(&Drawing::Torque(Box::new(sweep()))).unwrap());
    for part in [
        "source to sink, K/W",
        "contact only, K/W",
        "torque, N·m",
        "stated 2.2 N·m",
        "largest 2.9 N·m: yield of the bolt",
        "lowest that strength allows, at 2.8 N·m",
        "≤ 0.8",
    ] {
        assert!(holds(&texts, part), "{part} is missing in {texts:?}");
    }
}

#[test]
fn a_lowest_point_inside_the_window_is_named_best() {
    let flag = "best 1.5 N·m, worse beyond";
    let mut falling = sweep();
    assert!(!holds(
        &texts(&svg(&Drawing::Torque(Box::new(falling.clone()))).unwrap()),
        "worse"
    ));
    for point in &mut falling.points {
        let torque = point.torque;
        point.source_to_sink.nominal = 0.4 + 0.2 * (torque - 1.5).powi(2);
    }
    falling.best = Some(1.5);
    assert!(!falling.gap_unknown());
    let texts = texts(&svg(&Drawing::Torque(Box::new(falling))).unwrap());
    assert!(holds(&texts, flag), "{texts:?}");
    assert!(holds(&texts, "lowest that strength allows, at 1.5 N·m"));
}

#[test]
fn both_formats_show_the_same_sheet() {
    for drawing in every_drawing() {
        let document = svg(&drawing).unwrap();
        texts(&document);
        let number = |name: &str| -> u32 {
            let from = document.find(name).unwrap() + name.len();
            let digits = document[from..].split('"').next().unwrap();
            digits.parse().unwrap()
        };
        let (width, height, varied) = decoded(&png(&drawing).unwrap());
        // Two pixels to the nominal one.
        assert_eq!(
            (width, height),
            (2 * number(" width=\""), 2 * number(" height=\""))
        );
        assert!(varied);
    }
}

#[test]
fn the_same_drawing_gives_the_same_bytes() {
    for drawing in every_drawing() {
        for format in [Format::Svg, Format::Png] {
            assert_eq!(render(&drawing, format), render(&drawing.clone(), format));
        }
    }
}

#[test]
fn hostile_titles_stay_text() {
    for mut drawing in every_drawing() {
        match &mut drawing {
            Drawing::Plan(map) => {
                map.title = HOSTILE.into();
                map.outlines[0].name = HOSTILE.into();
                map.unit = HOSTILE.into();
            }
            Drawing::PressureAndGap(pair) => {
                pair.pressure.title = HOSTILE.repeat(40);
                pair.pressure.outlines[0].name = HOSTILE.into();
                pair.gap.quantity = HOSTILE.repeat(9);
                pair.gap.unit = HOSTILE.into();
            }
            Drawing::Comparison(plot) => {
                plot.title = HOSTILE.repeat(40);
                plot.rows[0].name = HOSTILE.repeat(9);
                plot.rows[0].notes[0] = HOSTILE.into();
            }
            Drawing::Faces(pair) => {
                pair.warm.title = HOSTILE.repeat(40);
                pair.cold.quantity = HOSTILE.into();
            }
            Drawing::Section(plot) => {
                plot.title = HOSTILE.repeat(40);
                plot.section.plates[0].name = HOSTILE.repeat(9);
                plot.section.through[0].name = HOSTILE.into();
            }
            Drawing::Cumulative(plot) => {
                plot.title = HOSTILE.repeat(40);
                plot.curves[0].label = HOSTILE.into();
                plot.marks[0].name = HOSTILE.into();
            }
            Drawing::Arrange(plot) => {
                plot.answer.title = HOSTILE.repeat(40);
                plot.answer.rows[0].label = HOSTILE.repeat(9);
            }
            Drawing::Torque(sweep) => {
                sweep.title = HOSTILE.into();
                sweep.group = "x".repeat(5000);
            }
            Drawing::Tornado(ranking) => {
                ranking.title = HOSTILE.repeat(40);
                ranking.inputs[0].input = HOSTILE;
            }
            Drawing::Joint(plot) => {
                plot.plan.title = HOSTILE.repeat(40);
                plot.told = HOSTILE.into();
                if let Some(cut) = &mut plot.cut {
                    cut.labels[0] = HOSTILE.repeat(9);
                }
            }
            Drawing::Evidence(plot) => {
                plot.title = HOSTILE.repeat(40);
                plot.panels[0].name = HOSTILE.repeat(9);
                plot.panels[0].rows[0].name = HOSTILE.into();
                plot.panels[0].rows[0].values = HOSTILE.into();
            }
            Drawing::Fit(plot) => plot.title = HOSTILE.repeat(40),
            Drawing::Profile(plot) => plot.answer.title = HOSTILE.repeat(40),
        }
        let document = svg(&drawing).unwrap();
        texts(&document);
        assert!(!document.contains("<script"));
        assert!(document.contains("&lt;script&gt;"));
        let control = |c: char| c.is_control() && c != '\n';
        assert!(!document.contains(control) && !document.contains('\u{FFFE}'));
        decoded(&png(&drawing).unwrap());
    }
}

#[test]
fn what_cannot_be_drawn_is_an_error() {
    let map = || PlanMap::pressure("", &field());
    let with = |change: &dyn Fn(&mut PlanMap)| {
        let mut changed = map();
        change(&mut changed);
        svg(&Drawing::Plan(Box::new(changed)))
    };
    assert_eq!(
        with(&|m| m.values.fill(f64::NAN)),
        Err(FigureError::Empty("the field"))
    );
    assert_eq!(
        with(&|m| m.values[3] = f64::INFINITY),
        Err(FigureError::NotFinite("the field"))
    );
    assert_eq!(
        with(&|m| m.size = [usize::MAX, 2]),
        Err(FigureError::Shape("the field"))
    );
    assert_eq!(
        with(&|m| m.window[2] = m.window[0]),
        Err(FigureError::Shape("the window"))
    );
    assert_eq!(
        with(&|m| m.window[2] = f64::NAN),
        Err(FigureError::NotFinite("the window"))
    );
    let pair_with = |change: &dyn Fn(&mut PlanPair)| {
        let mut changed = pair();
        change(&mut changed);
        svg(&Drawing::PressureAndGap(Box::new(changed)))
    };
    assert_eq!(
        pair_with(&|p| p.gap.values.fill(f64::NAN)),
        Err(FigureError::Empty("the field"))
    );
    assert_eq!(
        pair_with(&|p| p.gap.values[3] = f64::INFINITY),
        Err(FigureError::NotFinite("the field"))
    );
    assert_eq!(
        pair_with(&|p| p.gap.values.truncate(3)),
        Err(FigureError::Shape("the field"))
    );
    assert_eq!(
        pair_with(&|p| p.gap.window[2] *= 2.0),
        Err(FigureError::Shape("two maps of different windows"))
    );
    assert_eq!(
        svg(&Drawing::Cumulative(cumulative(0))),
        Err(FigureError::Empty("the curves"))
    );
    let mut empty = sweep();
    empty.points.clear();
    assert_eq!(
        svg(&Drawing::Torque(Box::new(empty))),
        Err(FigureError::Empty("the sweep"))
    );
    let mut lost = sweep();
    lost.points[2].contact.nominal = f64::NAN;
    assert_eq!(
        svg(&Drawing::Torque(Box::new(lost))),
        Err(FigureError::NotFinite("the sweep"))
    );
}

#[test]
fn lone_and_level_data_are_drawn() {
    let mut one = sweep();
    one.points.truncate(1);
    let mut level = cumulative(1);
    level.curves[0].points = vec![(3e-3, 0.0)];
    let mut map = PlanMap::conductance("level", &field());
    map.values.fill(0.0);
    let mut cell = PlanMap::pressure("one cell", &field());
    (cell.size, cell.values) = ([1, 1], vec![7e6]);
    for drawing in [
        Drawing::Torque(Box::new(one)),
        Drawing::Cumulative(level),
        Drawing::Plan(Box::new(map)),
        Drawing::Plan(Box::new(cell)),
    ] {
        texts(&svg(&drawing).unwrap());
        decoded(&png(&drawing).unwrap());
    }
}
