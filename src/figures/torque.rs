//! Resistance against torque: what tightening buys, and where the bolt ends it.

use crate::{
    estimate::{Band, BestBy, Side, TorqueSweep},
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid},
        clip::Frame,
        drawable,
        flags::{Flag, Flags},
        legend::{Sample, hatch, hollow_dot, legend},
        lettering::{Anchor, Lettering},
        ramp,
        setting::{Setting, Width},
        sheet::{ACCENT, Colour, INK, LABEL, NARROW, PAPER, Sheet, Stroke, WIDE},
    },
    joint::Limit,
    report::sweep::worse,
    uncertainty::CONFIDENCE,
    units::{Shown, Unit},
};

const WIDTH: f64 = 560.0;
const UPPER: f64 = 210.0;
const LOWER: f64 = 140.0;
const BETWEEN: f64 = 20.0;

const REQUIRED: Stroke = Stroke::dashed(WIDE, ACCENT, &[8.0, 3.0]);
const STATED: Stroke = Stroke::solid(0.8, INK);
const LARGEST: Stroke = Stroke::solid(0.8, ACCENT);
const KNEE: Stroke = Stroke::dashed(0.8, INK, &[2.0, 2.0]);
const FURTHER: Stroke = Stroke::dashed(0.8, ACCENT, &[2.0, 2.0]);
/// The bar of the window.
const WINDOW: Colour = Colour(0x3F, 0x8F, 0x5B);
const BAR: f64 = 6.0;

/// One torque, N m, with a band.
#[derive(Clone, Copy)]
struct Point {
    torque: f64,
    low: f64,
    nominal: f64,
    high: f64,
}

/// Draws the sweep.
pub(super) fn draw(sweep: &TorqueSweep, setting: Setting) -> Result<Sheet, FigureError> {
    let upper_points = with_minimum(sweep, &band(sweep, |point| point.source_to_sink)?)?;
    let lower_points = band(sweep, |point| point.contact)?;
    let stated = drawable(sweep.stated, "the stated torque")?;
    let best = match sweep.best {
        Some(torque) => Some(drawable(torque, "the best torque")?),
        None => None,
    };
    let torques = || upper_points.iter().map(|p| p.torque).chain([stated]);
    let lever = setting.units.unit(Shown::Torque);
    let (margin, width) = (setting.width.margin(), setting.width.sheet(WIDTH));
    let x_axis = Axis::over(
        lever.of(torques().fold(f64::INFINITY, f64::min)),
        lever.of(torques().fold(f64::NEG_INFINITY, f64::max)),
    );
    let required = match sweep.required {
        Some((limit, bound)) => Some((drawable(limit, "the requirement")?, bound)),
        None => None,
    };
    let upper_axis = upper_axis(&upper_points, required.map(|(limit, _)| limit));
    let lower_axis = lower_axis(&lower_points);

    let note = required.map(|(limit, bound)| requirement_note(limit, bound));
    let beside = note.as_ref().map_or(10.0, |lines| {
        let width = |line: &String| note_lettering().width(line);
        lines.iter().map(width).fold(0.0, f64::max) + 8.0
    });
    let left =
        margin + axis::side_room(&upper_axis, UPPER).max(axis::side_room(&lower_axis, LOWER));
    let right = width - margin - beside;
    let across = |torque: f64| left + x_axis.place(lever.of(torque)) * (right - left);

    let high = required.is_some_and(|(limit, _)| upper_axis.place(limit) > 0.85);
    let flags = Flags::arranged(
        torque_flags(sweep, (&x_axis, lever, setting.width), &across)?,
        // Not over the numbers of the upright axis, whose topmost stands as high as a label, nor
        // over the note of a requirement that lies as high.
        [left, if high { right } else { width - margin }],
    );
    let mut sheet = Sheet::new(width);
    let subtitle = format!(
        "resistance against the torque of {}, {} case",
        sweep.group, sweep.case
    );
    let top = sheet.header(&sweep.title, &subtitle, setting.width) + flags.height() + 8.0;
    let upper = Frame {
        left,
        top,
        right,
        bottom: top + UPPER,
    };
    let lower = Frame {
        top: upper.bottom + BETWEEN,
        bottom: upper.bottom + BETWEEN + LOWER,
        ..upper
    };

    let barred = sweep
        .largest
        .map(|(largest, _)| across(largest).clamp(left, right));
    let parted = sweep
        .window
        .limits
        .iter()
        .find(|limit| limit.side == Side::Least)
        .map(|limit| across(limit.torque).clamp(left, right));
    for frame in [upper, lower] {
        if let Some(to) = parted.filter(|to| *to > left) {
            hatch(&mut sheet, Frame { right: to, ..frame });
        }
        if let Some(from) = barred.filter(|from| *from < right) {
            hatch(
                &mut sheet,
                Frame {
                    left: from,
                    ..frame
                },
            );
        }
    }
    axis::left(
        &mut sheet,
        upper,
        (&upper_axis, "source to sink, K/W"),
        Grid::Faint,
    );
    axis::left(
        &mut sheet,
        lower,
        (&lower_axis, "contact only, K/W"),
        Grid::Faint,
    );
    axis::bottom(&mut sheet, upper, (&x_axis, None));
    let title = format!("torque, {}", lever.name);
    axis::bottom(&mut sheet, lower, (&x_axis, Some(&title)));

    let at = |frame: Frame, axis: &Axis, point: Point, value: f64| {
        [
            across(point.torque),
            frame.bottom - axis.place(value) * frame.height(),
        ]
    };
    for (frame, axis, points) in [
        (upper, &upper_axis, &upper_points),
        (lower, &lower_axis, &lower_points),
    ] {
        let mut outline: Vec<[f64; 2]> =
            points.iter().map(|p| at(frame, axis, *p, p.low)).collect();
        outline.extend(points.iter().rev().map(|p| at(frame, axis, *p, p.high)));
        if points.iter().any(|point| point.low < point.high) {
            sheet.area(frame.area(&outline), band_colour());
        }
    }
    if let (Some((limit, _)), Some(lines)) = (required, note) {
        draw_requirement(&mut sheet, upper, &upper_axis, (limit, &lines));
    }
    flags.draw(&mut sheet, upper, lower.bottom);
    for (frame, axis, points) in [
        (upper, &upper_axis, &upper_points),
        (lower, &lower_axis, &lower_points),
    ] {
        let line: Vec<[f64; 2]> = points
            .iter()
            .map(|p| at(frame, axis, *p, p.nominal))
            .collect();
        sheet.line_within(frame, &line, nominal());
        if let [only] = line.as_slice() {
            sheet.disc(*only, 3.0, nominal().colour);
        }
    }
    if let Some(bar) = window_bar(sweep, upper, &across) {
        sheet.area(bar, WINDOW);
    }
    if let Some(best) = best
        && let Some(value) = between(&upper_points, best, |point| point.nominal)
    {
        let place = [
            across(best),
            upper.bottom - upper_axis.place(value) * upper.height(),
        ];
        if upper.holds(place) {
            hollow_dot(&mut sheet, place, nominal().colour);
        }
    }

    let room = Frame {
        left: margin,
        top: lower.bottom + BELOW + 6.0,
        right: width - margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(
        &mut sheet,
        room,
        &key(
            sweep,
            [
                barred.is_some_and(|from| from < right),
                parted.is_some_and(|to| to > left),
            ],
            lever,
        ),
    ) + 12.0;
    Ok(sheet)
}

/// The bar along the foot of the frame over the torques that heat and strength allow.
fn window_bar(
    sweep: &TorqueSweep,
    frame: Frame,
    across: &impl Fn(f64) -> f64,
) -> Option<Vec<[f64; 2]>> {
    let both = sweep.window.both?;
    let at = |torque: f64| across(torque).clamp(frame.left, frame.right);
    let [from, to] = [both.low, both.high].map(|end| at(end.torque));
    let [top, foot] = [frame.bottom - BAR, frame.bottom];
    let bar = [[from, top], [to, top], [to, foot], [from, foot]];
    (from < to).then(|| frame.area(&bar))
}

/// The points with the minimum between them, its band as wide as that of its neighbours.
fn with_minimum(sweep: &TorqueSweep, points: &[Point]) -> Result<Vec<Point>, FigureError> {
    let mut all = points.to_vec();
    let Some(found) = sweep.minimum else {
        return Ok(all);
    };
    let torque = drawable(found.torque, "the minimum")?;
    let value = drawable(found.source_to_sink, "the minimum")?;
    let at = |of: fn(&Point) -> f64| between(points, torque, of);
    let band = at(|p| p.low).zip(at(|p| p.high)).zip(at(|p| p.nominal));
    let (low, high) = band.map_or((value, value), |((low, high), nominal)| {
        (value + low - nominal, value + high - nominal)
    });
    all.push(Point {
        torque,
        low,
        nominal: value,
        high,
    });
    all.sort_by(|one, other| one.torque.total_cmp(&other.torque));
    Ok(all)
}

fn nominal() -> Stroke {
    Stroke::solid(2.0, ramp::colour(0.85))
}

fn band_colour() -> Colour {
    Colour(0xCB, 0xDD, 0xE8)
}

/// The points of one result, torque rising; bands without draws have no width.
fn band(
    sweep: &TorqueSweep,
    result: impl Fn(&crate::estimate::TorquePoint) -> Band,
) -> Result<Vec<Point>, FigureError> {
    const WHAT: &str = "the sweep";
    let mut points = Vec::with_capacity(sweep.points.len());
    for point in &sweep.points {
        let Band { low, nominal, high } = result(point);
        points.push(Point {
            torque: drawable(point.torque, WHAT)?,
            low: drawable(low.unwrap_or(nominal), WHAT)?,
            nominal: drawable(nominal, WHAT)?,
            high: drawable(high.unwrap_or(nominal), WHAT)?,
        });
    }
    if points.is_empty() {
        return Err(FigureError::Empty(WHAT));
    }
    points.sort_by(|a, b| a.torque.total_cmp(&b.torque));
    Ok(points)
}

fn extent(points: &[Point]) -> (f64, f64) {
    let all = || points.iter().flat_map(|p| [p.low, p.nominal, p.high]);
    (
        all().fold(f64::INFINITY, f64::min),
        all().fold(f64::NEG_INFINITY, f64::max),
    )
}

/// The requirement is taken in where that does not squeeze the curve into a corner.
fn upper_axis(points: &[Point], limit: Option<f64>) -> Axis {
    let (low, high) = extent(points);
    let span = (high - low).max(0.1 * high.abs());
    let near = |limit: &f64| {
        (*limit > low - span && *limit < high + span)
            || (low > 0.0 && *limit > low / 3.0 && *limit < 3.0 * high)
    };
    match limit.filter(near) {
        Some(limit) => resistance_axis(low.min(limit), high.max(limit)),
        None => resistance_axis(low, high),
    }
}

fn lower_axis(points: &[Point]) -> Axis {
    let (low, high) = extent(points);
    resistance_axis(low, high)
}

/// Logarithmic where an even axis would flatten the useful end of the curve.
fn resistance_axis(low: f64, high: f64) -> Axis {
    if low > 0.0 && high > 6.0 * low {
        Axis::logarithmic(low / 1.15, high * 1.15)
    } else {
        Axis::around(low, high)
    }
}

/// Labels of the stated and the best torque, the knee and every limit within the axis.
fn torque_flags(
    sweep: &TorqueSweep,
    (x_axis, lever, width): (&Axis, Unit, Width),
    across: &impl Fn(f64) -> f64,
) -> Result<Vec<Flag>, FigureError> {
    let flag = |torque: f64, text: String, stroke: Stroke| Flag {
        x: across(torque),
        text,
        stroke,
    };
    let drawn = |torque: f64| (x_axis.low..=x_axis.high).contains(&lever.of(torque));
    let number = |torque: f64| told(torque, lever);
    let mut flags = vec![flag(
        sweep.stated,
        format!("stated {}", number(sweep.stated)),
        STATED,
    )];
    if let Some((largest, limit)) = sweep.largest {
        let largest = drawable(largest, "the largest torque")?;
        if drawn(largest) {
            let text = match width {
                Width::Full => format!("largest {}: {limit}", number(largest)),
                Width::Narrow => format!("largest {}", number(largest)),
            };
            flags.push(flag(largest, text, LARGEST));
        }
    }
    if let Some(best) = worse(sweep).map(|worse| worse.beyond)
        && drawn(best)
    {
        let stroke = Stroke {
            width: 0.8,
            ..nominal()
        };
        let text = match width {
            Width::Full => format!("best {}, worse beyond", number(best)),
            Width::Narrow => format!("best {}", number(best)),
        };
        flags.push(flag(best, text, stroke));
    }
    if let Some(knee) = sweep.window.knee {
        let knee = drawable(knee, "the knee")?;
        if drawn(knee) {
            flags.push(flag(knee, format!("knee {}", number(knee)), KNEE));
        }
    }
    for limit in &sweep.window.limits {
        let torque = drawable(limit.torque, "a limit")?;
        let told = sweep.largest.is_some_and(|(_, name)| name == limit.name);
        if drawn(torque) && !told {
            flags.push(flag(
                torque,
                format!("{} {}", limit.name, number(torque)),
                FURTHER,
            ));
        }
    }
    Ok(flags)
}

fn note_lettering() -> Lettering {
    Lettering::plain(LABEL - 1.0, ACCENT, Anchor::Start)
}

fn requirement_note(limit: f64, bound: Limit) -> [String; 2] {
    let sign = match bound {
        Limit::Most => '≤',
        Limit::Least => '≥',
    };
    ["required".into(), format!("{sign} {}", axis::plain(limit))]
}

/// The requirement as a line with a note beside the frame, or an arrow towards it from the edge.
fn draw_requirement(
    sheet: &mut Sheet,
    frame: Frame,
    axis: &Axis,
    (limit, lines): (f64, &[String; 2]),
) {
    let share = axis.place(limit);
    let y = frame.bottom - share.clamp(0.0, 1.0) * frame.height();
    let (x, text) = (frame.right + 7.0, note_lettering());
    if (0.0..=1.0).contains(&share) {
        sheet.line(&[[frame.left, y], [frame.right, y]], REQUIRED);
        sheet.text([x, y - 3.0], lines[0].clone(), text);
        sheet.text([x, y + 11.0], lines[1].clone(), text);
        return;
    }
    let inwards = if share > 1.0 { 1.0 } else { -1.0 };
    let start = y + inwards * 14.0;
    let stroke = Stroke::solid(NARROW * 2.0, ACCENT);
    let middle = x + 4.0;
    sheet.line(&[[middle, start], [middle, y]], stroke);
    sheet.line(
        &[
            [middle - 3.0, y + inwards * 5.0],
            [middle, y],
            [middle + 3.0, y + inwards * 5.0],
        ],
        stroke,
    );
    let first = if share > 1.0 {
        start + 12.0
    } else {
        start - 18.0
    };
    sheet.text([x, first], lines[0].clone(), text);
    sheet.text([x, first + 14.0], lines[1].clone(), text);
}

/// A value at a torque, linear between points.
fn between(points: &[Point], torque: f64, of: fn(&Point) -> f64) -> Option<f64> {
    if let [only] = points {
        return Some(of(only));
    }
    let pair = points
        .windows(2)
        .find(|pair| pair[0].torque <= torque && torque <= pair[1].torque)?;
    let span = (pair[1].torque - pair[0].torque).max(f64::MIN_POSITIVE);
    let t = (torque - pair[0].torque) / span;
    Some(of(&pair[0]) + t * (of(&pair[1]) - of(&pair[0])))
}

/// The band by its quantiles: a share of 0.9 is from 5 % to 95 %.
fn band_name(confidence: Option<f64>) -> String {
    let share = confidence.unwrap_or(CONFIDENCE);
    let [low, high] = [50.0 - 50.0 * share, 50.0 + 50.0 * share];
    format!(
        "nominal in the band from {} % to {} %",
        axis::plain(low),
        axis::plain(high)
    )
}

fn best_name(sweep: &TorqueSweep) -> &'static str {
    match (sweep.best_by(), sweep.resists()) {
        (BestBy::Minimum, _) => "minimum",
        (BestBy::Strength, false) => "lowest that strength allows",
        (BestBy::Strength, true) => "highest that strength allows",
        (BestBy::Separation, false) => "lowest that separation allows",
        (BestBy::Separation, true) => "highest that separation allows",
    }
}

/// A torque with its unit.
fn told(torque: f64, lever: Unit) -> String {
    format!("{} {}", axis::plain(lever.of(torque)), lever.name)
}

fn key(sweep: &TorqueSweep, [barred, parted]: [bool; 2], lever: Unit) -> Vec<(Sample, String)> {
    let banded = sweep.points.iter().any(|p| p.source_to_sink.high.is_some());
    let mut items = vec![if banded {
        (
            Sample::Band(band_colour(), nominal()),
            band_name(sweep.window.confidence),
        )
    } else {
        (Sample::Line(nominal()), "nominal".to_owned())
    }];
    if let Some(best) = sweep.best {
        items.push((
            Sample::HollowDot(nominal().colour),
            format!("{}, at {}", best_name(sweep), told(best, lever)),
        ));
    }
    match (barred, parted) {
        (true, true) => items.push((
            Sample::Hatch,
            "beyond the largest torque, or the faces may part".into(),
        )),
        (true, false) => items.push((Sample::Hatch, "beyond the largest torque".into())),
        (false, true) => items.push((Sample::Hatch, "the faces may part".into())),
        (false, false) => {}
    }
    items.push(match (sweep.window.both, &sweep.window.heat) {
        (Some(_), Some(_)) => (
            Sample::Patch(WINDOW),
            "torque window: heat and strength met".into(),
        ),
        (Some(_), None) => (
            Sample::Patch(WINDOW),
            "torque window by strength alone".into(),
        ),
        (None, _) => (
            Sample::Patch(PAPER),
            "no torque meets heat and strength".into(),
        ),
    });
    if sweep.required.is_some() {
        items.push((Sample::Line(REQUIRED), "requirement".into()));
    }
    items
}
