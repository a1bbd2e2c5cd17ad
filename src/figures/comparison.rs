//! Joints side by side: their bands on one axis, their pressure on one scale.

use crate::{
    estimate::Band,
    figures::{
        FigureError,
        axis::{self, Axis, BELOW},
        clip::Frame,
        drawable,
        fonts::Weight,
        legend::{Sample, corners, hollow_dot, legend},
        lettering::{Anchor, Lettering},
        picture::Picture,
        plan::{PlanMap, small},
        ramp::{self, Ramp},
        setting::{Setting, Width},
        sheet::{ACCENT, Colour, FAINT, GREY, INK, LABEL, NARROW, PAPER, Sheet, Stroke, WIDE},
    },
    units::{Shown, System},
};

/// Several joints on one sheet.
#[derive(Clone, Debug, PartialEq)]
pub struct ComparisonPlot {
    /// Title.
    pub title: String,
    /// What is shown: source to sink, and in which case.
    pub subtitle: String,
    /// The joints, from above.
    pub rows: Vec<ComparisonRow>,
    /// Where the requirement lies, K/W, when all have the same.
    pub required: Option<f64>,
}

/// One joint.
#[derive(Clone, Debug, PartialEq)]
pub struct ComparisonRow {
    /// Its name.
    pub name: String,
    /// What stands below the name, line by line.
    pub notes: Vec<String>,
    /// Source to sink, K/W.
    pub band: Band,
    /// Whether it is the best at nominal.
    pub best: bool,
    /// Its pressure.
    pub pressure: PlanMap,
}

/// Room on the sheet, points.
struct Room {
    margin: f64,
    /// For names.
    names: f64,
    /// For the bands.
    bands: f64,
    /// Most a map may take.
    map: [f64; 2],
    /// For the bar of the colours at least.
    bar: f64,
}

const FULL: Room = Room {
    margin: 20.0,
    names: 165.0,
    bands: 250.0,
    map: [160.0, 82.0],
    bar: 120.0,
};
const NARROW_ROOM: Room = Room {
    margin: 12.0,
    names: 94.0,
    bands: 112.0,
    map: [88.0, 60.0],
    bar: 92.0,
};
/// Least height of a row, points.
const ROW: f64 = 52.0;
/// Height of a line, points.
const LINE: f64 = 14.0;
/// Half of the height of a band, points.
const HALF: f64 = 7.0;
/// Between the columns and between the rows, points.
const GAP: f64 = 18.0;
const REQUIRED: Stroke = Stroke::dashed(WIDE, ACCENT, &[8.0, 3.0]);
const BAND: Colour = Colour(0xCB, 0xDD, 0xE8);

/// Draws the comparison.
pub(super) fn draw(plot: &ComparisonPlot, setting: Setting) -> Result<Sheet, FigureError> {
    let (units, room) = match setting.width {
        Width::Full => (setting.units, FULL),
        Width::Narrow => (setting.units, NARROW_ROOM),
    };
    let told = told_in(plot, units);
    let plot = &told;
    let across = band_axis(plot)?;
    let colours = colour_axis(plot)?;
    let scale = length_scale(plot, room.map)?;
    let sizes = plot
        .rows
        .iter()
        .map(|row| small::size(&row.pressure, scale))
        .collect::<Result<Vec<[f64; 2]>, FigureError>>()?;
    let widest = sizes
        .iter()
        .fold(room.bar, |most: f64, size| most.max(size[0]));
    let left = room.margin + room.names;
    let maps = left + room.bands + GAP;
    let mut sheet = Sheet::new(maps + widest + room.margin);
    let top = sheet.header(&plot.title, &plot.subtitle, setting.width) + 8.0;
    let lines: Vec<Vec<Line>> = plot.rows.iter().map(|row| lines(row, &room)).collect();
    let heights: Vec<f64> = lines
        .iter()
        .zip(&sizes)
        .map(|(lines, size)| row_height(size[1], lines.len()))
        .collect();
    let whole: f64 = heights.iter().sum();
    let frame = Frame {
        left,
        top,
        right: left + room.bands,
        bottom: top + whole,
    };
    upright_lines(&mut sheet, frame, &across);
    if let Some(limit) = plot
        .required
        .filter(|limit| (0.0..=1.0).contains(&across.place(*limit)))
    {
        let x = frame.left + across.place(limit) * frame.width();
        sheet.line(&[[x, frame.top], [x, frame.bottom]], REQUIRED);
    }
    let mut y = top;
    for (index, (row, size)) in plot.rows.iter().zip(&sizes).enumerate() {
        let height = heights[index];
        let middle = y + 0.5 * height;
        name(&mut sheet, &lines[index], [room.margin, middle]);
        band(&mut sheet, row, (frame, middle), &across)?;
        let corner = [maps, middle - 0.5 * size[1]];
        small::draw(&mut sheet, &row.pressure, (corner, scale), &colours)?;
        y += height;
    }
    axis::bottom(&mut sheet, frame, (&across, Some("source to sink, K/W")));
    let bar = Frame {
        left: maps,
        top: frame.bottom + 2.0,
        right: maps + widest,
        bottom: frame.bottom + 11.0,
    };
    sheet.pictures.push(Picture::level_bar(bar, Ramp::Sea));
    let title = match setting.width {
        Width::Full => "contact pressure",
        Width::Narrow => "pressure",
    };
    let title = format!("{title}, {}", units.unit(Shown::Pressure).name);
    axis::bottom(&mut sheet, bar, (&colours, Some(&title)));
    sheet.closed_within(bar, &corners(bar), Stroke::solid(NARROW, GREY));
    let below = Frame {
        left: room.margin,
        top: bar.bottom + BELOW + 6.0,
        right: sheet.size[0] - room.margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, below, &key(plot)) + 12.0;
    Ok(sheet)
}

/// The same joints with their pressures and notes in a system of units.
fn told_in(plot: &ComparisonPlot, units: System) -> ComparisonPlot {
    let row = |row: &ComparisonRow| ComparisonRow {
        notes: row.notes.iter().map(|note| units.restated(note)).collect(),
        pressure: row.pressure.told_in(units),
        ..row.clone()
    };
    ComparisonPlot {
        rows: plot.rows.iter().map(row).collect(),
        ..plot.clone()
    }
}

fn row_height(map: f64, lines: usize) -> f64 {
    ROW.max(map + 14.0).max(LINE * lines as f64 + 10.0)
}

/// One axis for all bands.
fn band_axis(plot: &ComparisonPlot) -> Result<Axis, FigureError> {
    let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
    for row in &plot.rows {
        let Band {
            low: least,
            nominal,
            high: most,
        } = row.band;
        for value in [least.unwrap_or(nominal), nominal, most.unwrap_or(nominal)] {
            let value = drawable(value, "a band")?;
            low = low.min(value);
            high = high.max(value);
        }
    }
    if low > high {
        return Err(FigureError::Empty("the comparison"));
    }
    Ok(if low > 0.0 && high > 6.0 * low {
        Axis::logarithmic(low / 1.15, high * 1.15)
    } else {
        Axis::around(low, high)
    })
}

/// One scale for all pressures, from zero, in their unit.
fn colour_axis(plot: &ComparisonPlot) -> Result<Axis, FigureError> {
    let mut highest: f64 = 0.0;
    for map in plot.rows.iter().map(|row| &row.pressure) {
        let [columns, rows] = map.size;
        if columns == 0 || rows == 0 || columns.checked_mul(rows) != Some(map.values.len()) {
            return Err(FigureError::Shape("the field"));
        }
        for value in map.values.iter().filter(|value| !value.is_nan()) {
            highest = highest.max(drawable(value * map.factor, "the field")?);
        }
    }
    Ok(Axis::over(0.0, highest))
}

/// Points to the metre at which every map finds room.
fn length_scale(plot: &ComparisonPlot, most: [f64; 2]) -> Result<f64, FigureError> {
    plot.rows.iter().try_fold(f64::INFINITY, |scale, row| {
        let [wide, tall] = small::size(&row.pressure, 1.0)?;
        Ok(scale.min(most[0] / wide).min(most[1] / tall))
    })
}

/// Faint lines at the ticks of the bands.
fn upright_lines(sheet: &mut Sheet, frame: Frame, axis: &Axis) {
    for (value, _) in axis.ticks(6) {
        let x = frame.left + axis.place(value) * frame.width();
        sheet.line(
            &[[x, frame.top], [x, frame.bottom]],
            Stroke::solid(0.5, FAINT),
        );
    }
}

/// A line beside a band, and how it is set.
type Line = (String, Lettering);

/// Name and notes in as many lines as they take.
fn lines(row: &ComparisonRow, room: &Room) -> Vec<Line> {
    let mut lettering = Lettering::plain(LABEL, INK, Anchor::Start);
    if row.best {
        lettering.weight = Weight::Bold;
    }
    let small = Lettering::plain(LABEL - 1.5, GREY, Anchor::Start);
    let wrapped = |text: &str, lettering: Lettering, most: usize| {
        let lines = lettering.wrapped(text, room.names - 10.0, most);
        lines.into_iter().map(move |line| (line, lettering))
    };
    let mut lines: Vec<Line> = wrapped(&row.name, lettering, 3).collect();
    for note in &row.notes {
        lines.extend(wrapped(note, small, 2));
    }
    lines
}

fn name(sheet: &mut Sheet, lines: &[Line], [left, middle]: [f64; 2]) {
    let mut y = middle - 0.5 * LINE * lines.len() as f64 + 11.0;
    for (line, lettering) in lines {
        sheet.text([left, y], line.clone(), *lettering);
        y += LINE;
    }
}

fn band(
    sheet: &mut Sheet,
    row: &ComparisonRow,
    (frame, middle): (Frame, f64),
    axis: &Axis,
) -> Result<(), FigureError> {
    let at = |value: f64| frame.left + axis.place(value) * frame.width();
    let nominal = drawable(row.band.nominal, "a band")?;
    if let (Some(low), Some(high)) = (row.band.low, row.band.high) {
        let place = Frame {
            left: at(low),
            top: middle - HALF,
            right: at(high).max(at(low) + 1.0),
            bottom: middle + HALF,
        };
        sheet.area(corners(place), BAND);
        sheet.closed_within(place, &corners(place), Stroke::solid(NARROW, GREY));
    }
    let x = at(nominal);
    let stroke = Stroke::solid(2.0, ramp::colour(0.85));
    sheet.line(
        &[[x, middle - HALF - 2.0], [x, middle + HALF + 2.0]],
        stroke,
    );
    if row.best {
        hollow_dot(sheet, [x, middle], stroke.colour);
    }
    let text = Lettering::plain(LABEL - 1.5, INK, Anchor::Middle);
    let shown = axis::significant(nominal, 4);
    let half = 0.5 * text.width(&shown);
    let x = x.clamp(frame.left + half + 2.0, frame.right - half);
    // On paper of its own, so that no line runs through the digits.
    let baseline = middle - HALF - 5.0;
    let ground = Frame {
        left: x - half - 1.5,
        top: baseline - text.size,
        right: x + half + 1.5,
        bottom: baseline + 2.0,
    };
    sheet.area(corners(ground), PAPER);
    sheet.text([x, baseline], shown, text);
    Ok(())
}

fn key(plot: &ComparisonPlot) -> Vec<(Sample, String)> {
    let stroke = Stroke::solid(2.0, ramp::colour(0.85));
    let banded = plot.rows.iter().any(|row| row.band.high.is_some());
    let mut items = vec![if banded {
        let name = "nominal in the band from 5 % to 95 %";
        (Sample::Band(BAND, stroke), name.to_owned())
    } else {
        (Sample::Line(stroke), "nominal".to_owned())
    }];
    items.push((
        Sample::HollowDot(stroke.colour),
        "best at nominal".to_owned(),
    ));
    if plot.required.is_some() {
        items.push((Sample::Line(REQUIRED), "requirement".to_owned()));
    }
    items
}
