//! Readings with the law through them; the likelihood of an unknown over its range.

use crate::{
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid},
        clip::Frame,
        drawable,
        legend::{Sample, hollow_dot, legend},
        ramp,
        setting::Width,
        sheet::{ACCENT, Colour, GREY, NARROW, Sheet, Stroke},
    },
    fit::{
        Branch, Series, Shape,
        profile::{Verdict, Walk},
        unknown::{Answer, Question},
    },
    report::fit::{measured, unit},
    units::System,
};

const MARGIN: f64 = 20.0;
const WIDTH: f64 = 560.0;
const HEIGHT: f64 = 320.0;

/// Points of a drawn law.
const STEPS: usize = 60;

/// Room beyond the readings, as a share of the range in logarithms.
const ROOM: f64 = 0.06;

const BAND: Colour = Colour(0xCB, 0xDD, 0xE8);
const WIDER: Colour = Colour(0xEA, 0xF1, 0xF5);
const THRESHOLD: Stroke = Stroke::dashed(1.0, ACCENT, &[8.0, 3.0]);

/// A fitted series and what its file is called.
#[derive(Clone, Debug, PartialEq)]
pub struct FitPlot {
    /// Title.
    pub title: String,
    /// Readings and laws.
    pub series: Series,
}

/// The likelihood of an unknown.
#[derive(Clone, Debug, PartialEq)]
pub struct ProfilePlot {
    /// What was asked.
    pub asked: Question,
    /// What was found.
    pub answer: Answer,
}

/// One branch in the shown units: (x; low, law, high; least, most of another reading).
type Bands = Vec<(f64, [f64; 5])>;

/// Draws readings with laws and bands on logarithmic axes.
pub(super) fn draw(plot: &FitPlot, units: System) -> Result<Sheet, FigureError> {
    const WHAT: &str = "the readings";
    let series = &plot.series;
    let (x_quantity, y_quantity) = (series.abscissa.quantity(), series.ordinate.fitted());
    let ((x_unit, x_size), (y_unit, y_size)) = (unit(x_quantity, units), unit(y_quantity, units));
    let mut extent = [[f64::INFINITY, f64::NEG_INFINITY]; 2];
    let mut widen = |axis: usize, value: f64| -> Result<(), FigureError> {
        let value = drawable(value, WHAT)?;
        extent[axis] = [extent[axis][0].min(value), extent[axis][1].max(value)];
        Ok(())
    };
    let curves: Vec<Bands> = series
        .branches
        .iter()
        .map(|branch| bands(branch, (x_size, y_size)))
        .collect();
    for branch in &series.branches {
        for reading in &branch.readings {
            let error = reading.deviation.unwrap_or(0.0).exp();
            widen(0, reading.abscissa.unwrap_or(f64::NAN) / x_size)?;
            widen(1, reading.conductance * error / y_size)?;
            widen(1, reading.conductance / error / y_size)?;
        }
    }
    for (_, [.., least, most]) in curves.iter().flatten() {
        widen(1, *least)?;
        widen(1, *most)?;
    }
    if extent[0][0] > extent[0][1] {
        return Err(FigureError::Empty(WHAT));
    }
    let [x_axis, y_axis] = extent.map(|[low, high]| {
        let room = (high / low).max(1.02).powf(ROOM);
        Axis::logarithmic(low / room, high * room)
    });
    let y_title = format!("{}, {y_unit}", measured(series.ordinate));
    let mut sheet = Sheet::new(WIDTH);
    let subtitle = format!(
        "{} against {}, with 90 % bands",
        measured(series.ordinate),
        series.abscissa.name()
    );
    let top = sheet.header(&plot.title, &subtitle, Width::Full) + 8.0;
    let frame = Frame {
        left: MARGIN + axis::side_room(&y_axis, HEIGHT),
        top,
        right: WIDTH - MARGIN,
        bottom: top + HEIGHT,
    };
    axis::left(&mut sheet, frame, (&y_axis, &y_title), Grid::Faint);
    let x_title = format!(
        "{}, {}",
        series.abscissa.name(),
        x_unit.replace(' ', "\u{a0}")
    );
    axis::bottom(&mut sheet, frame, (&x_axis, Some(&x_title)));
    let at = |x: f64, y: f64| {
        [
            frame.left + x_axis.place(x) * frame.width(),
            frame.bottom - y_axis.place(y) * frame.height(),
        ]
    };
    let filled = series.branches.len() == 1;
    for (curve, colour) in curves.iter().zip(colours()) {
        for (low, high, shade) in [(3, 4, WIDER), (0, 2, BAND)] {
            let side = |of: usize| curve.iter().map(move |(x, y)| at(*x, y[of]));
            if filled {
                let mut outline: Vec<[f64; 2]> = side(low).collect();
                outline.extend(side(high).rev());
                sheet.area(frame.area(&outline), shade);
            } else {
                for edge in [low, high] {
                    let line: Vec<[f64; 2]> = side(edge).collect();
                    let dash = if shade == WIDER {
                        &[2.0, 3.0][..]
                    } else {
                        &[6.0, 2.0][..]
                    };
                    sheet.line_within(frame, &line, Stroke::dashed(NARROW, colour, dash));
                }
            }
        }
    }
    for ((curve, branch), colour) in curves.iter().zip(&series.branches).zip(colours()) {
        let line: Vec<[f64; 2]> = curve.iter().map(|(x, y)| at(*x, y[1])).collect();
        sheet.line_within(frame, &line, Stroke::solid(2.0, colour));
        for (index, reading) in branch.readings.iter().enumerate() {
            let x = reading.abscissa.unwrap_or(f64::NAN) / x_size;
            let y = reading.conductance / y_size;
            if let Some(deviation) = reading.deviation {
                let ends = [at(x, y / deviation.exp()), at(x, y * deviation.exp())];
                sheet.line_within(frame, &ends, Stroke::solid(NARROW, GREY));
            }
            if branch.outliers.iter().any(|outlier| outlier.index == index) {
                hollow_dot(&mut sheet, at(x, y), ACCENT);
            } else {
                sheet.disc(at(x, y), 3.0, colour);
            }
        }
    }
    let room = Frame {
        left: MARGIN,
        top: frame.bottom + BELOW + 6.0,
        right: WIDTH - MARGIN,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &key(series)) + 12.0;
    Ok(sheet)
}

fn colours() -> [Colour; 2] {
    [ramp::colour(0.85), ramp::colour(0.5)]
}

/// The law of a branch with both bands over its range, in shown units.
fn bands(branch: &Branch, (x_size, y_size): (f64, f64)) -> Bands {
    let [from, to] = branch.range();
    match &branch.shape {
        Shape::Law(law) => (0..=STEPS)
            .map(|step| from * (to / from).powf(step as f64 / STEPS as f64))
            .map(|x| {
                let ([low, high], [least, most]) = (law.band(x), law.prediction(x));
                let values = [low, law.at(x), high, least, most];
                (x / x_size, values.map(|value| value / y_size))
            })
            .collect(),
        Shape::Table(table) => {
            // The reach of 90 % for a scatter known well enough.
            let reach = (1.645 * table.scatter).exp();
            let rows = table.rows.iter();
            rows.map(|(x, y)| {
                let values = [*y, *y, *y, y / reach, y * reach];
                (x / x_size, values.map(|value| value / y_size))
            })
            .collect()
        }
    }
}

fn key(series: &Series) -> Vec<(Sample, String)> {
    let mut items = Vec::new();
    let form = |branch: &Branch| match branch.shape {
        Shape::Law(_) => "power law",
        Shape::Table(_) => "table",
    };
    for (branch, colour) in series.branches.iter().zip(colours()) {
        let name = branch
            .direction
            .map_or_else(String::new, |way| format!(" of {}", way.name()));
        items.push((Sample::Dot(colour), format!("readings{name}")));
        let line = Stroke::solid(2.0, colour);
        items.push(match series.branches.len() {
            1 => (
                Sample::Band(BAND, line),
                format!("{} and its band", form(branch)),
            ),
            _ => (Sample::Line(line), format!("{}{name}", form(branch))),
        });
    }
    if series.branches.len() == 1 {
        items.push((Sample::Patch(WIDER), "another reading".into()));
    } else {
        let grey = |dash| Sample::Line(Stroke::dashed(NARROW, GREY, dash));
        items.push((grey(&[6.0, 2.0]), "bands of the laws".into()));
        items.push((grey(&[2.0, 3.0]), "another reading".into()));
    }
    if series
        .branches
        .iter()
        .any(|branch| !branch.outliers.is_empty())
    {
        items.push((Sample::HollowDot(ACCENT), "stands apart, kept".into()));
    }
    items
}

/// Draws −2 ln L above its least over the range of the unknown.
pub(super) fn draw_profile(plot: &ProfilePlot) -> Result<Sheet, FigureError> {
    const WHAT: &str = "the likelihood";
    /// Thresholds up to which the curve is shown.
    const SHOWN: f64 = 4.0;
    let (asked, answer) = (&plot.asked, &plot.answer);
    let range = &asked.range;
    let from = drawable(range.from, WHAT)?;
    let to = drawable(range.to, WHAT)?;
    let x_axis = match range.walk {
        Walk::Even => Axis::over(from, to),
        Walk::Factors => Axis::logarithmic(from, to),
    };
    let highest = answer.profile.curve.iter().map(|point| point.1);
    let highest = drawable(highest.fold(0.0, f64::max), WHAT)?;
    let y_axis = Axis::over(
        0.0,
        highest.clamp(1.2 * answer.threshold, SHOWN * answer.threshold),
    );
    let mut sheet = Sheet::new(WIDTH);
    let verdict = match answer.profile.verdict {
        Verdict::Determined => "determined",
        Verdict::BelowOnly | Verdict::AboveOnly => "bounded on one side",
        Verdict::Undetermined => "NOT determined by these readings",
    };
    let name = asked.unknown.name();
    let top = sheet.header(&answer.title, &format!("{verdict}: {name}"), Width::Full) + 8.0;
    let frame = Frame {
        left: MARGIN + axis::side_room(&y_axis, HEIGHT),
        top,
        right: WIDTH - MARGIN - 8.0,
        bottom: top + HEIGHT,
    };
    let across = |share: f64| frame.left + x_axis.place(range.at(share)) * frame.width();
    let up = |value: f64| frame.bottom - y_axis.place(value) * frame.height();
    let [low, high] = answer.profile.interval.map(across);
    let inside = Frame {
        left: low,
        right: high,
        ..frame
    };
    sheet.area(crate::figures::legend::corners(inside), WIDER);
    axis::left(
        &mut sheet,
        frame,
        (&y_axis, "−2 ln likelihood above its least"),
        Grid::Faint,
    );
    let x_title = format!("value, {}", asked.unknown.scale());
    axis::bottom(&mut sheet, frame, (&x_axis, Some(&x_title)));
    let level = up(answer.threshold);
    sheet.line(&[[frame.left, level], [frame.right, level]], THRESHOLD);
    let line: Vec<[f64; 2]> = answer
        .profile
        .curve
        .iter()
        .step_by(4)
        .map(|(share, value)| [across(*share), up(value.min(1e3 * answer.threshold))])
        .collect();
    let curve = Stroke::solid(2.0, ramp::colour(0.85));
    sheet.line_within(frame, &line, curve);
    for node in &answer.nodes {
        let x = frame.left + x_axis.place(*node) * frame.width();
        sheet.line(
            &[[x, frame.bottom], [x, frame.bottom - 5.0]],
            Stroke::solid(NARROW, GREY),
        );
    }
    hollow_dot(
        &mut sheet,
        [across(answer.profile.best), up(0.0)],
        curve.colour,
    );
    let room = Frame {
        left: MARGIN,
        top: frame.bottom + BELOW + 6.0,
        right: WIDTH - MARGIN,
        bottom: f64::INFINITY,
    };
    let shown = |share: f64| asked.unknown.shown(range.at(share));
    let [low, high] = answer.profile.interval;
    let items = [
        (Sample::Line(curve), "likelihood".to_owned()),
        (
            Sample::HollowDot(curve.colour),
            format!("likeliest, {}", shown(answer.profile.best)),
        ),
        (
            Sample::Patch(WIDER),
            format!("90 %: {} to {}", shown(low), shown(high)),
        ),
        (Sample::Line(THRESHOLD), "bound of 90 %".into()),
    ];
    sheet.size[1] = legend(&mut sheet, room, &items) + 12.0;
    Ok(sheet)
}
