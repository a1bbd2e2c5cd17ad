//! The layout of every kind of figure: texts lie on the sheet and never on each other, and no
//! numbers make it panic.

use proptest::prelude::*;

use crate::{
    estimate::{
        Band, End, Minimum, Range, SectionBolt, SectionPlate, Side, Solid, StackSection, Through,
        TorqueLimit, TorquePoint, TorqueSweep, TorqueWindow,
    },
    figures::{
        CumulativePlot, Curve, DetailKind, Drawing, FacePair, PlanBolt, PlanDetail, PlanMap,
        PlanOutline, PlanPair, PlanShape, RadiusMark, Ramp, Scale, SectionPlot,
        clip::Frame,
        lettering::{Anchor, Lettering, Turn},
        narrow_svg_in,
        setting::{Setting, Width},
        sheet as draw,
        sheet::{Mark, Sheet},
        svg,
    },
    joint::Limit,
    resistance::columns::{Across, Section},
    units::System,
};

/// The rectangle a text covers.
fn text_box(at: [f64; 2], content: &str, lettering: Lettering) -> Frame {
    let width = lettering.width(content);
    let before = match lettering.anchor {
        Anchor::Start => 0.0,
        Anchor::Middle => width / 2.0,
        Anchor::End => width,
    };
    let (rise, fall) = (0.76 * lettering.size, 0.24 * lettering.size);
    match lettering.turn {
        Turn::None => Frame {
            left: at[0] - before,
            top: at[1] - rise,
            right: at[0] - before + width,
            bottom: at[1] + fall,
        },
        Turn::Up => Frame {
            left: at[0] - rise,
            top: at[1] + before - width,
            right: at[0] + fall,
            bottom: at[1] + before,
        },
    }
}

fn texts_are_clear(sheet: &Sheet) -> Result<(), String> {
    let boxes: Vec<_> = sheet
        .marks
        .iter()
        .filter_map(|mark| match mark {
            Mark::Text(at, content, lettering) => {
                Some((content, text_box(*at, content, *lettering)))
            }
            _ => None,
        })
        .collect();
    for (index, (text, a)) in boxes.iter().enumerate() {
        let [width, height] = sheet.size;
        if a.left < 0.0 || a.top < 0.0 || a.right > width || a.bottom > height {
            return Err(format!("{text:?} leaves the sheet: {a:?}"));
        }
        for (other, b) in &boxes[..index] {
            // Boxes include room for accents and descenders, so a hair of overlap shows nothing.
            let across = a.right.min(b.right) - a.left.max(b.left);
            let down = a.bottom.min(b.bottom) - a.top.max(b.top);
            if across > 0.5 && down > 0.5 {
                return Err(format!("{text:?} lies on {other:?}"));
            }
        }
    }
    Ok(())
}

fn plan(window: [f64; 2], factor: f64, scale: Scale, bolts: usize) -> PlanMap {
    PlanMap {
        title: "A joint with a title that is long enough to be broken into lines".into(),
        window: [0.0, 0.0, window[0], window[1]],
        size: [12, 8],
        values: (0..96).map(|k| f64::from(k % 13) * factor).collect(),
        quantity: "contact pressure".into(),
        unit: "MPa".into(),
        factor: 1.0,
        peak: None,
        scale,
        ramp: Ramp::Sea,
        outlines: vec![PlanOutline {
            name: "base plate".into(),
            shape: PlanShape::Rectangle {
                corner: [0.0, 0.0],
                size: window,
            },
        }],
        bolts: (0..bolts)
            .map(|k| PlanBolt {
                at: [
                    window[0] * (k as f64 + 0.5) / bolts as f64,
                    window[1] * ((k * 7 % 5) as f64 + 0.5) / 5.0,
                ],
                hole_radius: 1e-3,
                head_radius: 2e-3,
                contact_radius: Some(4e-3),
            })
            .collect(),
        details: vec![PlanDetail {
            kind: DetailKind::Foot,
            shape: PlanShape::Rectangle {
                corner: [0.0, 0.0],
                size: window.map(|side| side / 4.0),
            },
        }],
        heated: Vec::new(),
        contact: Vec::new(),
    }
}

/// A pressure map with a gap map that grows from zero to `factor`, µm.
fn pair(window: [f64; 2], factor: f64, bolts: usize) -> PlanPair {
    let pressure = plan(window, 30.0, Scale::Linear, bolts);
    PlanPair {
        gap: PlanMap {
            quantity: "gap".into(),
            unit: "µm".into(),
            ramp: Ramp::Umber,
            ..plan(window, factor, Scale::Linear, bolts)
        },
        pressure,
    }
}

fn sweep(stated: f64, largest: f64, required: f64, size: f64) -> TorqueSweep {
    let band = |nominal: f64| Band {
        low: Some(0.8 * nominal),
        nominal,
        high: Some(1.3 * nominal),
    };
    TorqueSweep {
        title: "Converter box on a panel".into(),
        group: "M4 socket, 6 places".into(),
        case: "service",
        field: "elastic",
        resolution: "normal",
        stated,
        largest: Some((largest, "pressure under the head")),
        best: Some(3.0),
        at_stated: 0.165,
        at_limit: None,
        bends: false,
        minimum: None,
        points: (1..=20)
            .map(|k| {
                let torque = f64::from(k) / 5.0;
                TorquePoint {
                    torque,
                    force: band(1000.0 * torque),
                    source_to_sink: band(size * (0.4 + 0.3 / torque)),
                    contact: band(size * 0.3 / torque),
                    added_by_joint: band(size * 0.3 / torque),
                    strength_use: None,
                    passes: torque < largest,
                }
            })
            .collect(),
        required: Some((required * size, Limit::Most)),
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
                    name: "pressure under the head",
                    torque: largest,
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
                    torque: largest,
                    by: "pressure under the head",
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

/// Two plates of any size about some bolts; temperatures of any size.
fn section([wide, tall]: [f64; 2], (size, bolts): (f64, usize), heat: Option<f64>) -> SectionPlot {
    let lines: Vec<f64> = (0..=8).map(|k| wide * f64::from(k) / 8.0).collect();
    let plate = |name: &str, foot: f64, rise: f64| SectionPlate {
        name: name.into(),
        solid: vec![Solid {
            along: [0.0, wide],
            heights: [foot, foot + 0.5 * tall],
        }],
        section: Section {
            heights: vec![foot, foot + 0.5 * tall],
            rise: vec![vec![Some(size * rise), Some(size * (rise + 0.5))]; lines.len()],
            along: lines.clone(),
        },
    };
    SectionPlot {
        title: "A joint with a title that is long enough to be broken into lines".into(),
        section: StackSection {
            across: Across::Y(0.3 * wide),
            plates: vec![
                plate("a base plate of some length", 0.5 * tall, 2.0),
                plate("panel", 0.0, -0.1),
            ],
            bolts: (0..bolts)
                .map(|k| SectionBolt {
                    number: 7 * k + 1,
                    along: wide * (k as f64 + 0.5) / bolts as f64,
                    head_radius: 0.02 * wide,
                    hole_radius: 0.01 * wide,
                })
                .collect(),
            heated: vec![[0.2 * wide, 0.9 * wide]],
            touching: vec![[0.1 * wide, 0.2 * wide]],
            through: ["beside bolt 1", "between bolts 1 and 8"]
                .map(|name| Through {
                    name: name.into(),
                    along: 0.4 * wide,
                    plates: vec![
                        vec![[0.5 * tall, size], [tall, 2.0 * size]],
                        vec![[0.0, 0.0], [0.5 * tall, 0.1 * size]],
                    ],
                })
                .to_vec(),
        },
        heat,
    }
}

/// Whether the texts of a drawing are clear in two systems of units, on a wide and a narrow sheet.
fn clear(drawing: &Drawing) -> Result<(), String> {
    for units in [System::Si, System::Inch] {
        for width in [Width::Full, Width::Narrow] {
            let sheet = draw(drawing, Setting { units, width }).map_err(|why| why.to_string())?;
            texts_are_clear(&sheet).map_err(|why| format!("{units:?} {width:?}: {why}"))?;
        }
    }
    Ok(())
}

proptest! {
    #![proptest_config(crate::fixed_cases(48))]

    #[test]
    fn texts_of_sections_are_clear(
        width in -3.0..0.5_f64,
        aspect in -3.0..2.0_f64,
        size in -12.0..12.0_f64,
        bolts in 0..40_usize,
        heated: bool,
    ) {
        let lengths = [10_f64.powf(width), 10_f64.powf(width + aspect)];
        let plot = section(lengths, (10_f64.powf(size), bolts), heated.then_some(22.0));
        prop_assert_eq!(clear(&Drawing::Section(Box::new(plot))), Ok(()));
    }

    #[test]
    fn texts_of_faces_are_clear(
        width in -3.0..0.5_f64,
        aspect in -1.5..1.5_f64,
        size in -12.0..12.0_f64,
        bolts in 0..12_usize,
    ) {
        let window = [10_f64.powf(width), 10_f64.powf(width + aspect)];
        let face = |name: &str| PlanMap {
            quantity: format!("face of {name}"),
            unit: "K".into(),
            ramp: Ramp::Ember,
            scale: Scale::Between([0.0, 12.0 * 10_f64.powf(size)]),
            ..plan(window, 10_f64.powf(size), Scale::Linear, bolts)
        };
        let pair = FacePair {
            warm: face("a base plate of some length"),
            cold: face("panel"),
            heat: Some(22.0),
        };
        prop_assert_eq!(clear(&Drawing::Faces(Box::new(pair))), Ok(()));
    }

    #[test]
    fn texts_of_plans_are_clear(
        width in -3.0..0.5_f64,
        aspect in -1.5..1.5_f64,
        size in -12.0..12.0_f64,
        logarithmic: bool,
        bolts in 0..12_usize,
    ) {
        let window = [10_f64.powf(width), 10_f64.powf(width + aspect)];
        let scale = if logarithmic { Scale::Logarithmic } else { Scale::Linear };
        prop_assert_eq!(clear(&Drawing::Plan(Box::new(plan(window, 10_f64.powf(size), scale, bolts)))), Ok(()));
    }

    #[test]
    fn texts_of_pairs_are_clear(
        width in -3.0..0.5_f64,
        aspect in -1.5..1.5_f64,
        size in -12.0..12.0_f64,
        bolts in 0..12_usize,
    ) {
        let window = [10_f64.powf(width), 10_f64.powf(width + aspect)];
        let pair = pair(window, 10_f64.powf(size), bolts);
        prop_assert_eq!(clear(&Drawing::PressureAndGap(Box::new(pair))), Ok(()));
    }

    #[test]
    fn texts_of_sweeps_are_clear(
        stated in 0.1..4.0_f64,
        largest in 0.1..5.0_f64,
        required in 0.01..100.0_f64,
        size in -9.0..9.0_f64,
    ) {
        let mut sweep = sweep(stated, largest, required, 10_f64.powf(size));
        prop_assert_eq!(clear(&Drawing::Torque(Box::new(sweep.clone()))), Ok(()));
        // With a best torque inside the window there is one more label.
        for point in &mut sweep.points {
            point.source_to_sink.nominal *= 1.0 + point.torque;
        }
        sweep.best = Some(stated.min(largest) / 2.0);
        prop_assert_eq!(clear(&Drawing::Torque(Box::new(sweep))), Ok(()));
    }

    #[test]
    fn texts_of_cumulative_plots_are_clear(
        totals in prop::collection::vec(0.0..50.0_f64, 1..14),
        radii in prop::collection::vec(0.0..12e-3_f64, 0..5),
        size in -9.0..9.0_f64,
    ) {
        let plot = CumulativePlot {
            title: "Round pair".into(),
            curves: totals
                .iter()
                .enumerate()
                .map(|(k, total)| Curve {
                    label: format!("bolt {}", k + 1),
                    points: vec![(2e-3, 0.0), (10e-3, total * 10_f64.powf(size))],
                })
                .collect(),
            marks: radii
                .iter()
                .map(|radius| RadiusMark { name: "edge of contact".into(), radius: *radius })
                .collect(),
        };
        prop_assert_eq!(clear(&Drawing::Cumulative(plot)), Ok(()));
    }
}

fn wild() -> impl Strategy<Value = f64> {
    prop_oneof![
        4 => -1.0..1.0_f64,
        2 => any::<f64>(),
        1 => Just(f64::NAN),
        1 => Just(f64::INFINITY),
        1 => Just(f64::MAX),
        1 => Just(f64::MIN_POSITIVE),
        1 => Just(0.0),
    ]
}

proptest! {
    #![proptest_config(crate::fixed_cases(24))]

    #[test]
    fn no_numbers_make_a_figure_panic(
        numbers in prop::collection::vec(wild(), 60),
        title in ".{0,40}",
        tame: bool,
    ) {
        // Half of the cases keep the frame sane, so that wild contents are reached and drawn.
        let n = |k: usize| numbers[k % numbers.len()];
        let frame = |k: usize, sane: f64| if tame { sane } else { n(k) };
        let map = PlanMap {
            title: title.clone(),
            window: [frame(0, 0.0), frame(1, 0.0), frame(2, 0.05), frame(3, 0.03)],
            size: [4, 3],
            values: (10..22).map(|k| frame(k, n(k).clamp(-1e9, 1e9))).collect(),
            factor: frame(4, 1.0),
            outlines: vec![
                PlanOutline {
                    name: title.clone(),
                    shape: PlanShape::Polygon(vec![[n(5), n(6)], [n(7), n(8)], [n(9), n(10)]]),
                },
                PlanOutline {
                    name: title.clone(),
                    shape: PlanShape::Disc { centre: [n(22), n(23)], radius: n(24) },
                },
            ],
            bolts: (0..3)
                .map(|k| PlanBolt {
                    at: [n(25 + k), n(28 + k)],
                    hole_radius: n(31 + k),
                    head_radius: n(34 + k),
                    contact_radius: Some(n(37 + k)),
                })
                .collect(),
            heated: vec![PlanShape::Rectangle { corner: [n(40), n(41)], size: [n(42), n(43)] }],
            details: [DetailKind::CutOut, DetailKind::Foot, DetailKind::Rib]
                .into_iter()
                .enumerate()
                .map(|(k, kind)| PlanDetail {
                    kind,
                    shape: PlanShape::Polygon(
                        (0..4).map(|p| [n(52 + k + 2 * p), n(53 + k + 2 * p)]).collect(),
                    ),
                })
                .collect(),
            contact: vec![(0..6).map(|p| [n(p), n(p + 9)]).collect()],
            ..plan([1.0, 1.0], 1.0, Scale::Logarithmic, 0)
        };
        let plot = CumulativePlot {
            title: title.clone(),
            curves: vec![Curve {
                label: title.clone(),
                points: (0..8).map(|k| (n(2 * k), n(2 * k + 1))).collect(),
            }],
            marks: vec![RadiusMark { name: title, radius: n(44) }],
        };
        let mut torque = sweep(2.2, 2.9, 0.8, 1.0);
        torque.stated = n(45);
        torque.best = Some(n(46));
        torque.minimum = Some(Minimum {
            torque: n(46),
            source_to_sink: n(52),
            added_by_joint: n(53),
        });
        torque.largest = Some((n(47), "yield"));
        torque.required = Some((n(48), Limit::Least));
        torque.points[3].torque = n(49);
        torque.points[5].contact.high = Some(n(50));
        torque.points[6].source_to_sink.nominal = n(51);
        let mut cut = section([frame(0, 0.05), frame(1, 0.01)], (frame(2, 1.0), 3), Some(frame(3, 22.0)));
        cut.section.plates[0].section.rise[1][1] = Some(frame(54, 1.0));
        cut.section.bolts[1].along = n(55);
        cut.section.heated = vec![[n(56), n(57)]];
        cut.section.touching.push([n(58), n(59)]);
        cut.section.through[0].along = n(4);
        cut.section.through[1].plates[0][0] = [n(5), frame(6, 0.5)];
        let faces = FacePair {
            warm: PlanMap { scale: Scale::Between([n(7), n(8)]), ..map.clone() },
            cold: map.clone(),
            heat: Some(n(9)),
        };
        let twice = PlanPair { pressure: map.clone(), gap: map.clone() };
        for drawing in [Drawing::Plan(Box::new(map)), Drawing::PressureAndGap(Box::new(twice)), Drawing::Cumulative(plot), Drawing::Torque(Box::new(torque)), Drawing::Section(Box::new(cut)), Drawing::Faces(Box::new(faces))] {
            // An error is as good as a figure; only a panic is not.
            let _ = svg(&drawing);
            let _ = narrow_svg_in(&drawing, System::Inch);
        }
    }
}
