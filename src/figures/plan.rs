//! A field over the plan of the joint: plates, holes, heads and contact edges on a map.

use crate::{
    estimate::FieldMap,
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid},
        clip::Frame,
        drawable,
        legend::{corners, legend},
        picture::Picture,
        ramp::Ramp,
        setting::{Setting, Width},
        sheet::{Colour, GREY, NARROW, Sheet, Stroke},
    },
    units::{Shown, System},
};

mod bolts;
mod contour;
mod faces;
mod pair;
pub(super) mod parts;
mod raster;
mod shapes;
pub(super) mod small;

pub use faces::FacePair;
pub(super) use faces::draw as draw_faces;
pub use pair::PlanPair;
pub(super) use pair::draw as draw_pair;
pub use shapes::{DetailKind, PlanBolt, PlanDetail, PlanOutline, PlanShape};

/// How the values of a map meet its colours.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Scale {
    /// Evenly from zero (or from the lowest value, where that is negative).
    Linear,
    /// By their logarithm, over at most three decades below the highest.
    Logarithmic,
    /// By their logarithm, over at most two decades below the highest.
    TwoDecades,
    /// Evenly between two values, SI, which several maps may share.
    Between([f64; 2]),
}

/// A field over the plan.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanMap {
    /// Title of the joint.
    pub title: String,
    /// Left, lower, right and upper edge of the window, m.
    pub window: [f64; 4],
    /// Columns and rows.
    pub size: [usize; 2],
    /// Values at cell centres, row by row from below, SI; `NaN` where there is nothing.
    pub values: Vec<f64>,
    /// The quantity, for the colour bar: `contact pressure`.
    pub quantity: String,
    /// The unit in which it is shown in SI: `MPa`.
    pub unit: String,
    /// Value in that unit over SI value.
    pub factor: f64,
    /// The highest value of the field itself, SI, which may lie between the cells; none to take theirs.
    pub peak: Option<f64>,
    /// How values meet colours.
    pub scale: Scale,
    /// The colours.
    pub ramp: Ramp,
    /// The plates, the upper one first.
    pub outlines: Vec<PlanOutline>,
    /// Parts of the plates: cut-outs, feet, ribs.
    pub details: Vec<PlanDetail>,
    /// The bolts, numbered in this order.
    pub bolts: Vec<PlanBolt>,
    /// Where heat enters, when that is not the whole face.
    pub heated: Vec<PlanShape>,
    /// Where contact ends, lines in joint coordinates, m; for fields whose contact is not round.
    pub contact: Vec<Vec<[f64; 2]>>,
}

impl PlanMap {
    /// The pressure of a field map, `MPa`; plates, bolts and heated zone are yet to be filled in.
    ///
    /// A solved field, which knows the gap, brings its own edge of contact.
    pub fn pressure(title: &str, field: &FieldMap) -> Self {
        Self {
            size: field.size,
            values: field.pressure.clone(),
            quantity: "contact pressure".into(),
            unit: "MPa".into(),
            factor: 1e-6,
            contact: match field.gap {
                Some(_) => contour::contact_edge(field),
                None => Vec::new(),
            },
            ..Self::without_field(title, field.window)
        }
    }

    /// A plan of a window, m, without a field; its parts are yet to be filled in.
    pub fn without_field(title: &str, window: [f64; 4]) -> Self {
        Self {
            title: title.into(),
            window,
            size: [0, 0],
            values: Vec::new(),
            quantity: String::new(),
            unit: String::new(),
            factor: 1.0,
            peak: None,
            scale: Scale::Linear,
            ramp: Ramp::Sea,
            outlines: Vec::new(),
            details: Vec::new(),
            bolts: Vec::new(),
            heated: Vec::new(),
            contact: Vec::new(),
        }
    }

    /// The local conductance of a field map, W/(m² K), over decades; likewise.
    pub fn conductance(title: &str, field: &FieldMap) -> Self {
        Self {
            values: field.conductance.clone(),
            quantity: "local conductance".into(),
            unit: "W/(m²·K)".into(),
            factor: 1.0,
            scale: Scale::Logarithmic,
            ..Self::pressure(title, field)
        }
    }

    /// The gap of a field map, µm, on a ramp of its own; likewise. None for the cone.
    pub fn gap(title: &str, field: &FieldMap) -> Option<Self> {
        Some(Self {
            values: field.gap.clone()?,
            quantity: "gap".into(),
            unit: "µm".into(),
            factor: 1e6,
            ramp: Ramp::Umber,
            ..Self::pressure(title, field)
        })
    }

    /// The same map told in a system of units; what is the same in all of them stays.
    pub(super) fn told_in(&self, units: System) -> Self {
        let told = [Shown::Pressure, Shown::Gap, Shown::Conductance];
        let found = told.into_iter().find(|shown| {
            let si = System::Si.unit(*shown);
            si.name == self.unit && units.unit(*shown) != si
        });
        let mut map = self.clone();
        if let Some(shown) = found {
            let unit = units.unit(shown);
            map.factor *= System::Si.unit(shown).size / unit.size;
            map.unit = unit.name.into();
        }
        map
    }

    /// The ground where the field has no value: tinted where paper white is a value itself.
    fn ground(&self) -> Option<Colour> {
        match self.ramp {
            Ramp::Sea | Ramp::Ember => None,
            Ramp::Umber => Some(parts::TINT),
        }
    }
}

/// The window on the sheet.
pub(super) struct View {
    pub(super) frame: Frame,
    pub(super) window: [f64; 4],
    pub(super) points_per_metre: f64,
    /// Colour where the field has no value; paper when none.
    pub(super) ground: Option<Colour>,
}

impl View {
    pub(super) fn point(&self, [x, y]: [f64; 2]) -> [f64; 2] {
        [
            self.frame.left + (x - self.window[0]) * self.points_per_metre,
            self.frame.bottom - (y - self.window[1]) * self.points_per_metre,
        ]
    }
}

const LARGEST: f64 = 400.0;

/// Draws the map.
pub(super) fn draw(map: &PlanMap, setting: Setting) -> Result<Sheet, FigureError> {
    let map = &map.told_in(setting.units);
    if setting.width == Width::Narrow {
        return pair::together(&[map], &subtitle(map), setting);
    }
    let margin = setting.width.margin();
    let colours = colour_axis(map)?;
    let window = map.window;
    let [wide, tall] = extent(window)?;
    let points_per_metre = (LARGEST / wide).min(LARGEST / tall);
    let (width, height) = (wide * points_per_metre, tall * points_per_metre);
    let length = setting.units.unit(Shown::Length);
    let [x_axis, y_axis] =
        [0, 1].map(|k| Axis::over(length.of(window[k]), length.of(window[k + 2])));
    let [x_title, y_title] = ["x", "y"].map(|name| format!("{name}, {}", length.name));

    // The colour bar needs room for its labels and title even beside a narrow strip.
    let area = height.max(170.0);
    let left = margin + axis::side_room(&y_axis, height);
    let bar_left = left + width.max(30.0) + 26.0;
    let bar_width = 14.0;
    let right = bar_left + bar_width + axis::side_room(&colours, area) + margin;
    let mut sheet = Sheet::new(right.max(360.0));
    let top = sheet.header(&map.title, &subtitle(map), setting.width) + 8.0;
    let frame = Frame {
        left,
        top: top + (area - height) / 2.0,
        right: left + width,
        bottom: top + f64::midpoint(area, height),
    };
    let view = View {
        frame,
        window,
        points_per_metre,
        ground: map.ground(),
    };
    sheet.pictures.push(raster::picture(map, &view, &colours));

    parts::draw(&mut sheet, &view, map);
    axis::left(&mut sheet, frame, (&y_axis, &y_title), Grid::Without);
    axis::bottom(&mut sheet, frame, (&x_axis, Some(&x_title)));

    let bar = Frame {
        left: bar_left,
        top,
        right: bar_left + bar_width,
        bottom: top + area,
    };
    sheet.pictures.push(Picture::bar(bar, map.ramp));
    sheet.closed_within(bar, &corners(bar), Stroke::solid(NARROW, GREY));
    let title = format!("{}, {}", map.quantity, map.unit);
    axis::right(&mut sheet, bar, (&colours, &title));

    let room = Frame {
        left: margin,
        top: (frame.bottom + BELOW).max(bar.bottom + 8.0) + 6.0,
        right: sheet.size[0] - margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &parts::key(map, &colours, view.ground)) + 12.0;
    Ok(sheet)
}

/// Width and height of a window that can be drawn, m.
pub(super) fn extent(window: [f64; 4]) -> Result<[f64; 2], FigureError> {
    for edge in window {
        drawable(edge, "the window")?;
    }
    let [wide, tall] = [window[2] - window[0], window[3] - window[1]];
    let fits = wide > 1e-12 && tall > 1e-12 && wide.max(tall) < 1e6 * wide.min(tall);
    if !fits || wide.max(tall) < 1e-9 * window.iter().fold(0.0, |m: f64, e| m.max(e.abs())) {
        return Err(FigureError::Shape("the window"));
    }
    Ok([wide, tall])
}

/// The highest value in words, since a colour cannot be read to three digits.
fn subtitle(map: &PlanMap) -> String {
    let highest = map
        .values
        .iter()
        .chain(&map.peak)
        .fold(f64::NEG_INFINITY, |high, value| high.max(*value));
    format!(
        "{}, at most {} {}",
        map.quantity,
        axis::significant(highest * map.factor, 3),
        map.unit
    )
}

fn colour_axis(map: &PlanMap) -> Result<Axis, FigureError> {
    let [columns, rows] = map.size;
    if columns == 0 || rows == 0 || columns.checked_mul(rows) != Some(map.values.len()) {
        return Err(FigureError::Shape("the field"));
    }
    let (mut low, mut high, mut least) = (f64::INFINITY, f64::NEG_INFINITY, f64::INFINITY);
    for value in map.values.iter().filter(|value| !value.is_nan()) {
        let shown = drawable(value * map.factor, "the field")?;
        low = low.min(shown);
        high = high.max(shown);
        if shown > 0.0 {
            least = least.min(shown);
        }
    }
    if low > high {
        return Err(FigureError::Empty("the field"));
    }
    if let Some(peak) = map.peak {
        high = high.max(drawable(peak * map.factor, "the field")?);
    }
    Ok(match map.scale {
        Scale::Between(ends) => {
            let [from, to] = ends.map(|end| drawable(end * map.factor, "the scale"));
            Axis::over(from?, to?)
        }
        Scale::Logarithmic if high > 0.0 => Axis::logarithmic(least.max(high * 1e-3), high),
        Scale::TwoDecades if high > 0.0 => Axis::logarithmic(least.max(high * 1e-2), high),
        _ => Axis::over(low.min(0.0), high.max(low.min(0.0))),
    })
}

fn grown(frame: Frame, by: f64) -> Frame {
    Frame {
        left: frame.left - by,
        top: frame.top - by,
        right: frame.right + by,
        bottom: frame.bottom + by,
    }
}
