//! Conductance gathered from the hole outwards, against the distance from the bolt axis.

use crate::{
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid},
        clip::Frame,
        drawable,
        flags::{Flag, Flags},
        legend::{Sample, legend},
        lettering::{Anchor, Lettering},
        ramp,
        setting::{Setting, Width},
        sheet::{GREY, INK, LABEL, NARROW, Sheet, Stroke},
    },
    units::{Shown, Unit},
};

/// The plot.
#[derive(Clone, Debug, PartialEq)]
pub struct CumulativePlot {
    /// Title of the joint.
    pub title: String,
    /// One curve per bolt or variant.
    pub curves: Vec<Curve>,
    /// Radii worth marking: hole, bearing, edge of contact.
    pub marks: Vec<RadiusMark>,
}

/// One curve.
#[derive(Clone, Debug, PartialEq)]
pub struct Curve {
    /// Its name: `bolt 1`.
    pub label: String,
    /// Radius, m, and conductance gathered up to it, W/K; radius rising.
    pub points: Vec<(f64, f64)>,
}

/// A radius with its name.
#[derive(Clone, Debug, PartialEq)]
pub struct RadiusMark {
    /// Its name: `edge of contact`.
    pub name: String,
    /// Radius, m.
    pub radius: f64,
}

const WIDTH: f64 = 560.0;
const HEIGHT: f64 = 250.0;
const END: Lettering = Lettering::plain(LABEL - 1.0, INK, Anchor::Start);

/// Shares of a total that are dotted on its curve.
const SHARES: [f64; 2] = [0.5, 0.95];

/// A name at the end of one or several curves that meet there.
struct EndLabel {
    value: f64,
    text: String,
    stroke: Stroke,
}

/// Draws the plot.
pub(super) fn draw(plot: &CumulativePlot, setting: Setting) -> Result<Sheet, FigureError> {
    let length = setting.units.unit(Shown::Length);
    let (margin, width) = (setting.width.margin(), setting.width.sheet(WIDTH));
    let curves = shown(plot, length)?;
    let farthest = curves
        .iter()
        .flat_map(|curve| curve.iter().map(|p| p[0]))
        .fold(0.0, f64::max);
    let highest = curves
        .iter()
        .flat_map(|curve| curve.iter().map(|p| p[1]))
        .fold(0.0, f64::max);
    let x_axis = Axis::over(0.0, 1.02 * farthest);
    let y_axis = Axis::over(0.0, 1.06 * highest);

    let single = curves.len() == 1;
    // On a narrow sheet names have no room beside the curves and stand in the key.
    let named = !single && setting.width == Width::Full;
    let ends = end_labels(plot, &curves);
    let percent = Axis {
        high: 106.0,
        ..Axis::over(0.0, 106.0)
    };
    let beside = if single {
        axis::side_room(&percent, HEIGHT)
    } else if named {
        ends.iter().map(|e| END.width(&e.text)).fold(0.0, f64::max) + 22.0
    } else {
        8.0
    };
    let mut sheet = Sheet::new(width);
    let subtitle = match plot.curves.as_slice() {
        [only] => format!("conductance gathered within a radius: {}", only.label),
        _ => "conductance gathered within a radius of each bolt".into(),
    };
    let top = sheet.header(&plot.title, &subtitle, setting.width);
    let left = margin + axis::side_room(&y_axis, HEIGHT);
    let right = width - margin - beside;
    let across = |radius: f64| left + x_axis.place(radius) * (right - left);

    let mut marks = Vec::new();
    for mark in &plot.marks {
        let radius = drawable(length.of(mark.radius), "the marks")?;
        if (0.0..=x_axis.high).contains(&radius) {
            marks.push(Flag {
                x: across(radius),
                text: format!("{} {} {}", mark.name, axis::plain(radius), length.name),
                stroke: Stroke::dashed(NARROW, GREY, &[4.0, 2.5]),
            });
        }
    }
    let flags = Flags::arranged(marks, [left, width - margin]);
    let top = top + flags.height() + 8.0;
    let frame = Frame {
        left,
        top,
        right,
        bottom: top + HEIGHT,
    };

    axis::left(
        &mut sheet,
        frame,
        (&y_axis, "conductance, W/K"),
        Grid::Faint,
    );
    let title = format!("distance from the bolt axis, {}", length.name);
    axis::bottom(&mut sheet, frame, (&x_axis, Some(&title)));
    flags.draw(&mut sheet, frame, frame.bottom);
    if single {
        let share = Axis {
            high: 100.0 * y_axis.high / highest.max(1e-300),
            ..percent
        };
        let share = if highest > 0.0 { share } else { percent };
        axis::right(&mut sheet, frame, (&share, "share of the total, %"));
    }
    for (index, curve) in curves.iter().enumerate() {
        let line: Vec<[f64; 2]> = curve
            .iter()
            .map(|p| [across(p[0]), frame.bottom - y_axis.place(p[1]) * HEIGHT])
            .collect();
        sheet.line_within(frame, &line, stroke(index, curves.len()));
        let colour = stroke(index, curves.len()).colour;
        if let [only] = line.as_slice() {
            sheet.disc(*only, 3.0, colour);
        }
        for share in SHARES {
            if let Some(radius) = crossing(curve, share) {
                let total = curve[curve.len() - 1][1];
                let at = [
                    across(radius),
                    frame.bottom - y_axis.place(share * total) * HEIGHT,
                ];
                sheet.disc(at, 3.0, colour);
            }
        }
    }
    if named {
        draw_ends(&mut sheet, frame, &y_axis, &ends);
    }
    let room = Frame {
        left: margin,
        top: frame.bottom + BELOW + 6.0,
        right: width - margin,
        bottom: f64::INFINITY,
    };
    let mut items = vec![(
        Sample::Dot(stroke(0, curves.len()).colour),
        "50 % and 95 % of the total".to_owned(),
    )];
    if !single && !named {
        let line = |end: EndLabel| (Sample::Line(end.stroke), end.text);
        items.extend(ends.into_iter().map(line));
    }
    sheet.size[1] = legend(&mut sheet, room, &items) + 12.0;
    Ok(sheet)
}

/// The curves in a unit of length and W/K.
fn shown(plot: &CumulativePlot, length: Unit) -> Result<Vec<Vec<[f64; 2]>>, FigureError> {
    if plot.curves.is_empty() {
        return Err(FigureError::Empty("the curves"));
    }
    plot.curves
        .iter()
        .map(|curve| {
            if curve.points.is_empty() {
                return Err(FigureError::Empty("a curve"));
            }
            curve
                .points
                .iter()
                .map(|&(radius, value)| {
                    Ok([
                        drawable(length.of(radius), "a curve")?,
                        drawable(value, "a curve")?,
                    ])
                })
                .collect()
        })
        .collect()
}

/// From dark to middle blue-green, continuous and dashed in turn, so that neighbours differ twice.
fn stroke(index: usize, count: usize) -> Stroke {
    const DASHES: [&[f64]; 3] = [&[], &[7.0, 2.5], &[2.0, 2.0]];
    let share = if count < 2 {
        0.0
    } else {
        index as f64 / (count - 1) as f64
    };
    Stroke::dashed(
        1.8,
        ramp::colour(0.95 - 0.5 * share),
        DASHES[index % DASHES.len()],
    )
}

/// Radius at which a share of the final value is first reached, linear between points.
fn crossing(curve: &[[f64; 2]], share: f64) -> Option<f64> {
    let goal = share * curve.last()?[1];
    let pair = curve
        .windows(2)
        .find(|pair| pair[0][1] < goal && pair[1][1] >= goal)?;
    let t = (goal - pair[0][1]) / (pair[1][1] - pair[0][1]);
    Some(pair[0][0] + t * (pair[1][0] - pair[0][0]))
}

/// Names at the ends of the curves; curves that end within half a percent share a line.
fn end_labels(plot: &CumulativePlot, curves: &[Vec<[f64; 2]>]) -> Vec<EndLabel> {
    const ROOM: f64 = 150.0;
    let last = |index: &usize| curves[*index].last().map_or(0.0, |point| point[1]);
    let mut order: Vec<usize> = (0..curves.len()).collect();
    order.sort_by(|a, b| last(b).total_cmp(&last(a)));
    let close = 0.005
        * order
            .iter()
            .map(|index| last(index).abs())
            .fold(0.0, f64::max);
    let mut groups: Vec<Vec<usize>> = Vec::new();
    for index in order {
        match groups.last_mut() {
            Some(group) if last(&group[0]) - last(&index) <= close => group.push(index),
            _ => groups.push(vec![index]),
        }
    }
    groups
        .into_iter()
        .map(|mut group| {
            let value = last(&group[0]);
            let total = format!(": {} W/K", axis::significant(value, 3));
            group.sort_unstable();
            let names: Vec<&str> = group
                .iter()
                .map(|k| plot.curves[*k].label.as_str())
                .collect();
            let names = END.shortened(&names.join(", "), ROOM - END.width(&total));
            EndLabel {
                value,
                text: names + &total,
                stroke: stroke(group[0], curves.len()),
            }
        })
        .collect()
}

/// Sets the names in a column, apart from each other, with a thin line to their curves.
fn draw_ends(sheet: &mut Sheet, frame: Frame, y_axis: &Axis, ends: &[EndLabel]) {
    const APART: f64 = 14.0;
    let most = (frame.height() / APART) as usize;
    let ends = &ends[..ends.len().min(most)];
    let mut heights: Vec<f64> = ends
        .iter()
        .map(|end| frame.bottom - y_axis.place(end.value) * frame.height())
        .collect();
    for k in 1..heights.len() {
        heights[k] = heights[k].max(heights[k - 1] + APART);
    }
    let mut floor = frame.bottom;
    for height in heights.iter_mut().rev() {
        *height = height.min(floor);
        floor = *height - APART;
    }
    for (end, height) in ends.iter().zip(heights) {
        let from = frame.bottom - y_axis.place(end.value) * frame.height();
        let line = [[frame.right + 2.0, from], [frame.right + 16.0, height]];
        sheet.line(&line, Stroke::solid(NARROW, end.stroke.colour));
        let at = [frame.right + 20.0, height + 0.36 * END.size];
        sheet.text(at, end.text.clone(), END);
    }
}
