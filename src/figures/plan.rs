//! A field over the plan of the joint: plates, holes, heads and contact edges on a map.

use crate::{
    estimate::FieldMap,
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid, Spread},
        clip::Frame,
        drawable,
        legend::{Sample, corners, legend},
        picture::Picture,
        ramp,
        sheet::{ACCENT, GREY, INK, NARROW, Sheet, Stroke, WIDE, circle},
    },
};

mod bolts;
mod raster;

/// How the values of a map meet its colours.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Scale {
    /// Evenly from zero (or from the lowest value, where that is negative).
    Linear,
    /// By their logarithm, over at most three decades below the highest.
    Logarithmic,
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
    /// The unit in which it is shown: `MPa`.
    pub unit: String,
    /// Shown value over SI value.
    pub factor: f64,
    /// How values meet colours.
    pub scale: Scale,
    /// The plates, the upper one first.
    pub outlines: Vec<PlanOutline>,
    /// The bolts, numbered in this order.
    pub bolts: Vec<PlanBolt>,
    /// Where heat enters, when that is not the whole face.
    pub heated: Option<PlanShape>,
}

/// The edge of one plate.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanOutline {
    /// Name of the plate.
    pub name: String,
    /// Its edge.
    pub shape: PlanShape,
}

/// A shape in plan, joint coordinates, m.
#[derive(Clone, Debug, PartialEq)]
pub enum PlanShape {
    /// A rectangle parallel to the axes.
    Rectangle {
        /// Lower left corner, m.
        corner: [f64; 2],
        /// Width and height, m.
        size: [f64; 2],
    },
    /// A disc.
    Disc {
        /// Centre, m.
        centre: [f64; 2],
        /// Radius, m.
        radius: f64,
    },
    /// A polygon, m.
    Polygon(Vec<[f64; 2]>),
}

/// One bolt in plan.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PlanBolt {
    /// Axis, joint coordinates, m.
    pub at: [f64; 2],
    /// Radius of the hole between the faces, m.
    pub hole_radius: f64,
    /// Outer radius under the head or washer, m.
    pub head_radius: f64,
    /// Radius where contact ends, m; none where it is not a circle.
    pub contact_radius: Option<f64>,
}

impl PlanMap {
    /// The pressure of a field map, `MPa`; plates, bolts and heated zone are yet to be filled in.
    pub fn pressure(title: &str, field: &FieldMap) -> Self {
        Self {
            title: title.into(),
            window: field.window,
            size: field.size,
            values: field.pressure.clone(),
            quantity: "contact pressure".into(),
            unit: "MPa".into(),
            factor: 1e-6,
            scale: Scale::Linear,
            outlines: Vec::new(),
            bolts: Vec::new(),
            heated: None,
        }
    }

    /// The local conductance of a field map, W/(m² K), over decades; likewise.
    pub fn conductance(title: &str, field: &FieldMap) -> Self {
        Self {
            values: field.conductance.clone(),
            quantity: "local conductance".into(),
            unit: "W/(m²\u{a0}K)".into(),
            factor: 1.0,
            scale: Scale::Logarithmic,
            ..Self::pressure(title, field)
        }
    }
}

impl PlanShape {
    /// Whether the shape covers a place.
    fn covers(&self, [x, y]: [f64; 2]) -> bool {
        match self {
            Self::Rectangle { corner, size } => {
                (0.0..=size[0]).contains(&(x - corner[0]))
                    && (0.0..=size[1]).contains(&(y - corner[1]))
            }
            Self::Disc { centre, radius } => (x - centre[0]).hypot(y - centre[1]) <= *radius,
            Self::Polygon(points) => {
                let mut inside = false;
                for (index, a) in points.iter().enumerate() {
                    let b = points[(index + 1) % points.len()];
                    if (a[1] > y) != (b[1] > y)
                        && x < a[0] + (y - a[1]) / (b[1] - a[1]) * (b[0] - a[0])
                    {
                        inside = !inside;
                    }
                }
                inside
            }
        }
    }

    /// The edge on the sheet.
    fn edge(&self, view: &View) -> Vec<[f64; 2]> {
        match self {
            Self::Rectangle {
                corner: [x, y],
                size: [w, h],
            } => [[*x, *y], [x + w, *y], [x + w, y + h], [*x, y + h]]
                .map(|p| view.point(p))
                .to_vec(),
            Self::Disc { centre, radius } => {
                circle(view.point(*centre), radius * view.points_per_metre)
            }
            Self::Polygon(points) => points.iter().map(|p| view.point(*p)).collect(),
        }
    }
}

/// The window on the sheet.
struct View {
    frame: Frame,
    window: [f64; 4],
    points_per_metre: f64,
}

impl View {
    fn point(&self, [x, y]: [f64; 2]) -> [f64; 2] {
        [
            self.frame.left + (x - self.window[0]) * self.points_per_metre,
            self.frame.bottom - (y - self.window[1]) * self.points_per_metre,
        ]
    }
}

const LARGEST: f64 = 400.0;
const MARGIN: f64 = 20.0;

const HIDDEN: Stroke = Stroke::dashed(1.0, INK, &[5.0, 2.5]);
const HEAD: Stroke = Stroke::solid(NARROW, INK);
const HOLE: Stroke = Stroke::solid(WIDE, INK);
const CONTACT: Stroke = Stroke::dashed(NARROW, INK, &[3.0, 2.2]);
const HEATED: Stroke = Stroke::dashed(WIDE, ACCENT, &[10.0, 2.5, 2.0, 2.5, 2.0, 2.5]);

/// Draws the map.
pub(super) fn draw(map: &PlanMap) -> Result<Sheet, FigureError> {
    let colours = colour_axis(map)?;
    let window = map.window;
    let [wide, tall] = [window[2] - window[0], window[3] - window[1]];
    for edge in window {
        drawable(edge, "the window")?;
    }
    let fits = wide > 1e-12 && tall > 1e-12 && wide.max(tall) < 1e6 * wide.min(tall);
    if !fits || wide.max(tall) < 1e-9 * window.iter().fold(0.0, |m: f64, e| m.max(e.abs())) {
        return Err(FigureError::Shape("the window"));
    }
    let points_per_metre = (LARGEST / wide).min(LARGEST / tall);
    let (width, height) = (wide * points_per_metre, tall * points_per_metre);
    let x_axis = Axis::over(window[0] * 1e3, window[2] * 1e3);
    let y_axis = Axis::over(window[1] * 1e3, window[3] * 1e3);

    // The colour bar needs room for its labels and title even beside a narrow strip.
    let area = height.max(170.0);
    let left = MARGIN + axis::side_room(&y_axis, height);
    let bar_left = left + width.max(30.0) + 26.0;
    let bar_width = 14.0;
    let right = bar_left + bar_width + axis::side_room(&colours, area) + MARGIN;
    let mut sheet = Sheet::new(right.max(360.0));
    let top = sheet.header(&map.title, &subtitle(map)) + 8.0;
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
    };
    sheet.pictures.push(raster::picture(map, &view, &colours));

    draw_plates(&mut sheet, &view, map);
    for bolt in &map.bolts {
        bolts::draw(&mut sheet, &view, bolt);
    }
    if map.bolts.len() > 1 {
        bolts::number(&mut sheet, &view, &map.bolts);
    }
    axis::left(&mut sheet, frame, (&y_axis, "y, mm"), Grid::Without);
    axis::bottom(&mut sheet, frame, (&x_axis, Some("x, mm")));

    let bar = Frame {
        left: bar_left,
        top,
        right: bar_left + bar_width,
        bottom: top + area,
    };
    sheet.pictures.push(Picture::bar(bar));
    sheet.closed_within(bar, &corners(bar), Stroke::solid(NARROW, GREY));
    let title = format!("{}, {}", map.quantity, map.unit);
    axis::right(&mut sheet, bar, (&colours, &title));

    let room = Frame {
        left: MARGIN,
        top: (frame.bottom + BELOW).max(bar.bottom + 8.0) + 6.0,
        right: sheet.size[0] - MARGIN,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &key(map, &colours)) + 12.0;
    Ok(sheet)
}

/// The highest value in words, since a colour cannot be read to three digits.
fn subtitle(map: &PlanMap) -> String {
    let highest = map
        .values
        .iter()
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
    Ok(match map.scale {
        Scale::Logarithmic if high > 0.0 => Axis::logarithmic(least.max(high * 1e-3), high),
        _ => Axis::over(low.min(0.0), high.max(low.min(0.0))),
    })
}

fn draw_plates(sheet: &mut Sheet, view: &View, map: &PlanMap) {
    for (index, outline) in map.outlines.iter().enumerate().rev() {
        draw_shape(sheet, view, &outline.shape, plate_stroke(index));
    }
    if let Some(zone) = &map.heated {
        draw_shape(sheet, view, zone, HEATED);
    }
}

fn draw_shape(sheet: &mut Sheet, view: &View, shape: &PlanShape, stroke: Stroke) {
    // Edges on the rim of the window are drawn whole, so the frame gives half a line.
    let frame = grown(view.frame, 1.0);
    if let PlanShape::Disc { centre, radius } = shape {
        let circle = (view.point(*centre), radius * view.points_per_metre);
        sheet.circle_within(frame, circle, stroke);
    } else {
        sheet.closed_within(frame, &shape.edge(view), stroke);
    }
}

/// The upper plate in full; what it may hide in dashes, as drawings do.
fn plate_stroke(index: usize) -> Stroke {
    if index == 0 {
        Stroke::solid(WIDE, INK)
    } else {
        HIDDEN
    }
}

fn key(map: &PlanMap, colours: &Axis) -> Vec<(Sample, String)> {
    let mut items: Vec<(Sample, String)> = map
        .outlines
        .iter()
        .enumerate()
        .map(|(index, outline)| (Sample::Line(plate_stroke(index)), outline.name.clone()))
        .collect();
    if !map.bolts.is_empty() {
        items.push((Sample::Ring(HOLE), "hole".into()));
        items.push((Sample::Ring(HEAD), "head or washer".into()));
    }
    if map.bolts.iter().any(|bolt| bolt.contact_radius.is_some()) {
        items.push((Sample::Ring(CONTACT), "edge of contact".into()));
    }
    if map.heated.is_some() {
        items.push((Sample::Line(HEATED), "heated zone".into()));
    }
    let under = |value: &f64| value * map.factor < colours.low * (1.0 - 1e-9);
    let lightest = Sample::Patch(ramp::colour(0.0));
    if colours.spread == Spread::Linear && map.values.contains(&0.0) {
        items.push((lightest, format!("no {}", map.quantity)));
    } else if colours.spread == Spread::Logarithmic && map.values.iter().any(under) {
        let text = format!("below {} {}", axis::plain(colours.low), map.unit);
        items.push((lightest, text));
    }
    items
}

fn grown(frame: Frame, by: f64) -> Frame {
    Frame {
        left: frame.left - by,
        top: frame.top - by,
        right: frame.right + by,
        bottom: frame.bottom + by,
    }
}
