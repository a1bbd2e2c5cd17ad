//! The stack cut along a row of bolts: temperatures in colour, and through the thickness beside it.

mod cut;
mod through;

use crate::{
    estimate::StackSection,
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid, TICK, significant},
        clip::Frame,
        drawable,
        legend::{Sample, corners, legend},
        lettering::{Anchor, Lettering},
        picture::Picture,
        ramp::Ramp,
        setting::{NARROW_SHEET, Setting, Width},
        sheet::{GREY, INK, LABEL, NARROW, Sheet, Stroke},
        warmth::{told, unit},
    },
    resistance::columns::Across,
    units::Shown,
};

/// The cut with what is needed to tell it.
#[derive(Clone, Debug, PartialEq)]
pub struct SectionPlot {
    /// Title of the joint.
    pub title: String,
    /// The cut, per watt.
    pub section: StackSection,
    /// Heat for which temperatures are told, W; per watt when none.
    pub heat: Option<f64>,
}

/// Width of the cut and of the panel beside it, points.
const WIDE: f64 = 400.0;
const BESIDE: f64 = 150.0;
/// Height at which the stack is drawn at least, and at most, points.
const LEAST: f64 = 130.0;
const MOST: f64 = 300.0;
/// Share of the range of temperatures that is rounding.
const ROUNDING: f64 = 1e-5;
/// Height of the bar, points.
const BAR: f64 = 9.0;
/// Height from the top of the panels to the cut: name, bar, its labels, numbers of the bolts.
const OVER: f64 = 18.0 + BAR + 30.0 + 22.0;

/// The cut on the sheet.
#[derive(Clone, Copy)]
struct View {
    frame: Frame,
    /// From where to where along the cut and in height, m.
    along: [f64; 2],
    heights: [f64; 2],
    /// Temperatures on colours, shown unit.
    colours: Axis,
    /// Shown temperature over that per watt.
    factor: f64,
}

impl View {
    fn x(&self, along: f64) -> f64 {
        let share = (along - self.along[0]) / (self.along[1] - self.along[0]);
        self.frame.left + share * self.frame.width()
    }

    fn y(&self, height: f64) -> f64 {
        let share = (height - self.heights[0]) / (self.heights[1] - self.heights[0]);
        self.frame.bottom - share * self.frame.height()
    }
}

/// Draws the cut.
pub(super) fn draw(plot: &SectionPlot, setting: Setting) -> Result<Sheet, FigureError> {
    let section = &plot.section;
    let [along, heights] = extent(section)?;
    let factor = plot.heat.unwrap_or(1.0);
    let [low, high] = warmth(section)?;
    let colours = Axis::over(
        drawable(low * factor, "the temperatures")?,
        drawable(high * factor, "the temperatures")?,
    );
    let length = setting.units.unit(Shown::Length);
    let margin = setting.width.margin();
    let [upright, places] =
        [heights, along].map(|[from, to]| Axis::over(length.of(from), length.of(to)));
    // Labels of the uprights are as wide at every height that a cut is drawn.
    let widest = match setting.width {
        Width::Full => WIDE,
        Width::Narrow => NARROW_SHEET - 2.0 * margin - axis::side_room(&upright, LEAST) - 24.0,
    };
    let (width, tall, stretch) = scaled(along, heights[1] - heights[0], widest);
    let left = margin + axis::side_room(&upright, tall);
    let beside = left + width + 0.5 * places.label_width(10).max(24.0) + 22.0;
    let mut sheet = Sheet::new(match setting.width {
        Width::Full => beside + BESIDE + margin + 12.0,
        Width::Narrow => NARROW_SHEET.max(left + width + margin),
    });
    let names: Vec<&str> = section
        .plates
        .iter()
        .map(|plate| plate.name.as_str())
        .collect();
    let range = format!(
        "{}; {}, {} to {} {}",
        names.join(" on "),
        told(plot.heat),
        significant(low * factor, 3),
        significant(high * factor, 3),
        unit(plot.heat)
    );
    let top = sheet.header(&plot.title, &range, setting.width) + 4.0 + OVER;
    let view = View {
        frame: Frame {
            left,
            top,
            right: left + width,
            bottom: top + tall,
        },
        along,
        heights,
        colours,
        factor,
    };
    bar(&mut sheet, &view, plot.heat);
    cut::draw(&mut sheet, &view, section);
    let height = format!("height, {}", length.name);
    axis::left(&mut sheet, view.frame, (&upright, &height), Grid::Without);
    let (name, other, line) = match section.across {
        Across::X(y) => ("x", "y", y),
        Across::Y(x) => ("y", "x", x),
    };
    let mut title = format!(
        "{name}, {unit}, at {other} = {} {unit}",
        axis::plain(length.of(line)),
        unit = length.name
    );
    if stretch > 1.0 {
        title = format!("{title}; heights drawn {} ×", axis::plain(stretch));
    }
    axis::bottom(&mut sheet, view.frame, (&places, Some(&title)));
    let panel = match setting.width {
        Width::Full => Frame {
            left: beside,
            right: beside + BESIDE,
            ..view.frame
        },
        Width::Narrow => {
            let top = view.frame.bottom + BELOW + 14.0;
            Frame {
                top,
                bottom: top + tall,
                right: left + widest,
                ..view.frame
            }
        }
    };
    let mut items = cut::key(section);
    let aside = View {
        frame: panel,
        ..view
    };
    let told = through::draw(&mut sheet, &aside, plot)?;
    if setting.width == Width::Narrow && !told.is_empty() {
        axis::left(&mut sheet, panel, (&upright, &height), Grid::Without);
    }
    items.extend(told);
    let room = Frame {
        left: margin,
        top: panel.bottom + BELOW + 6.0,
        right: sheet.size[0] - margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &items) + 12.0;
    Ok(sheet)
}

/// The name over the colours, those over the cut.
fn bar(sheet: &mut Sheet, view: &View, heat: Option<f64>) {
    let top = view.frame.top - OVER + 18.0;
    let bar = Frame {
        top,
        bottom: top + BAR,
        ..view.frame
    };
    let lettering = Lettering::plain(LABEL, INK, Anchor::Start);
    let name = format!("temperature, {}", unit(heat));
    let name = lettering.shortened(&name, bar.width().max(150.0));
    sheet.text([bar.left, top - 0.55 * TICK], name, lettering);
    sheet.pictures.push(Picture::level_bar(bar, Ramp::Ember));
    axis::bottom(sheet, bar, (&view.colours, Some("")));
    sheet.closed_within(bar, &corners(bar), Stroke::solid(NARROW, GREY));
}

/// From where to where solid reaches along the cut, and through it, m.
fn extent(section: &StackSection) -> Result<[[f64; 2]; 2], FigureError> {
    let parts = || section.plates.iter().flat_map(|plate| &plate.solid);
    let mut ends = [[f64::INFINITY, f64::NEG_INFINITY]; 2];
    for part in parts() {
        for end in part.along.iter().chain(&part.heights) {
            drawable(*end, "the section")?;
        }
        for (ends, part) in ends.iter_mut().zip([part.along, part.heights]) {
            *ends = [ends[0].min(part[0]), ends[1].max(part[1])];
        }
    }
    if ends[0][0] > ends[0][1] {
        return Err(FigureError::Empty("the section"));
    }
    let [wide, tall] = ends.map(|[from, to]| to - from);
    let sound = wide > 1e-12 && tall > 1e-12 && tall < 1e3 * wide && wide < 1e6 * tall;
    if sound {
        Ok(ends)
    } else {
        Err(FigureError::Shape("the section"))
    }
}

/// Lowest and highest temperature of what is solid, per watt.
fn warmth(section: &StackSection) -> Result<[f64; 2], FigureError> {
    let values = section
        .plates
        .iter()
        .flat_map(|plate| plate.section.rise.iter().flatten().flatten());
    let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
    for value in values {
        let value = drawable(*value, "the temperatures")?;
        low = low.min(value);
        high = high.max(value);
    }
    if low > high {
        return Err(FigureError::Empty("the temperatures"));
    }
    // A held sink is at zero but for rounding.
    let rounding = ROUNDING * (high - low);
    Ok([low, high].map(|end| if end.abs() < rounding { 0.0 } else { end }))
}

/// Width and height of the cut, points, and how much more the heights are drawn than the lengths.
fn scaled([from, to]: [f64; 2], height: f64, wide: f64) -> (f64, f64, f64) {
    const STEPS: [f64; 7] = [1.0, 1.5, 2.0, 3.0, 4.0, 5.0, 8.0];
    let true_height = wide * height / (to - from);
    if true_height > MOST {
        // A tall stack is drawn true and narrow, but not so narrow that its axis has no scale.
        let width = (wide * MOST / true_height).max(120.0);
        return (width, MOST, MOST / height * (to - from) / width);
    }
    let decades = (0..6).flat_map(|decade| STEPS.map(|step| step * 10_f64.powi(decade)));
    let stretch = decades
        .into_iter()
        .find(|stretch| stretch * true_height >= LEAST)
        .unwrap_or(1.0);
    (wide, (stretch * true_height).min(MOST), stretch)
}

/// The strokes of the places whose temperatures stand beside the cut.
fn place_stroke(index: usize) -> Stroke {
    const DASHES: [&[f64]; 2] = [&[], &[6.0, 2.5]];
    Stroke::dashed(1.5, INK, DASHES[index % DASHES.len()])
}

fn sample(stroke: Stroke, name: &str) -> (Sample, String) {
    (Sample::Line(stroke), name.to_owned())
}
