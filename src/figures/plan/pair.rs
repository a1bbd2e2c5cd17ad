//! Pressure and gap over the same plan, side by side: where the faces touch, and where they part.

use crate::{
    estimate::FieldMap,
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid, TICK},
        clip::Frame,
        legend::{Sample, corners, legend},
        lettering::{Anchor, Lettering},
        picture::Picture,
        plan::{PlanMap, View, colour_axis, extent, parts, raster, subtitle},
        setting::{NARROW_SHEET, Setting, Width},
        sheet::{GREY, INK, LABEL, NARROW, Sheet, Stroke},
    },
    units::Shown,
};

/// Pressure and gap of one joint on the same window.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanPair {
    /// The pressure, whose title stands for both.
    pub pressure: PlanMap,
    /// The gap.
    pub gap: PlanMap,
}

impl PlanPair {
    /// Pressure and gap of a solved field; none for the cone, which knows no gap.
    ///
    /// Plates, bolts and heated zone are yet to be filled in, by [`PlanPair::furnished`].
    pub fn of(title: &str, field: &FieldMap) -> Option<Self> {
        Some(Self {
            pressure: PlanMap::pressure(title, field),
            gap: PlanMap::gap(title, field)?,
        })
    }

    /// The same change to both maps.
    #[must_use]
    pub fn furnished(self, furnish: impl Fn(PlanMap) -> PlanMap) -> Self {
        Self {
            pressure: furnish(self.pressure),
            gap: furnish(self.gap),
        }
    }
}

/// Width over height from which the maps stand one above the other.
const STRIP: f64 = 2.2;
/// Largest width and height of a map beside the other, points.
const BESIDE: [f64; 2] = [290.0, 400.0];
/// Largest width and height of a map above the other, points.
const ABOVE: [f64; 2] = [520.0, 240.0];
/// Least width of a panel, points: its bar must carry a name and some labels.
const LEAST: f64 = 190.0;
/// Height of a bar, points.
const BAR: f64 = 9.0;
/// Height from the top of a panel to its map, points: name, bar and the labels of the bar.
const OVER: f64 = 18.0 + BAR + 30.0;

/// How two maps of one window lie on the sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Arrangement {
    Beside,
    Above,
}

/// Draws the pair.
pub(in crate::figures) fn draw(pair: &PlanPair, setting: Setting) -> Result<Sheet, FigureError> {
    let maps = [&pair.pressure, &pair.gap].map(|map| map.told_in(setting.units));
    let told = format!("{}; {}", subtitle(&maps[0]), subtitle(&maps[1]));
    together(&[&maps[0], &maps[1]], &told, setting)
}

/// Draws maps of one window with what is told under the title of the first.
pub(super) fn together(
    maps: &[&PlanMap],
    told: &str,
    setting: Setting,
) -> Result<Sheet, FigureError> {
    let margin = setting.width.margin();
    let window = maps[0].window;
    let [wide, tall] = extent(window)?;
    let mut edges = maps.iter().flat_map(|map| window.iter().zip(&map.window));
    // Negated, so that an edge that is not a number counts as different.
    if !edges.all(|(one, other)| (one - other).abs() <= 1e-9 * wide.max(tall)) {
        return Err(FigureError::Shape("two maps of different windows"));
    }
    let colours = maps
        .iter()
        .map(|map| colour_axis(map))
        .collect::<Result<Vec<Axis>, FigureError>>()?;
    let length = setting.units.unit(Shown::Length);
    let axes = [0, 1].map(|k| Axis::over(length.of(window[k]), length.of(window[k + 2])));
    let (arrangement, room) = if setting.width == Width::Narrow {
        let side = axis::side_room(&axes[1], ABOVE[1]);
        let across = NARROW_SHEET - 2.0 * margin - side - 10.0;
        (Arrangement::Above, [across, BESIDE[0]])
    } else if wide > STRIP * tall {
        (Arrangement::Above, ABOVE)
    } else {
        (Arrangement::Beside, BESIDE)
    };
    let points_per_metre = (room[0] / wide).min(room[1] / tall);
    let size = [wide * points_per_metre, tall * points_per_metre];
    let titles = ["x", "y"].map(|name| format!("{name}, {}", length.name));

    // A label at the end of an axis reaches half its width past it.
    let label = colours
        .iter()
        .chain([&axes[0]])
        .map(|axis| axis.label_width(10))
        .fold(0.0, f64::max);
    let left = margin + axis::side_room(&axes[1], size[1]);
    let panel = size[0].max(LEAST);
    let step = match arrangement {
        Arrangement::Beside => [panel + label + 14.0, 0.0],
        Arrangement::Above => [0.0, OVER + size[1] + BELOW + 14.0],
    };
    let right = left + step[0] + panel + margin.max(label / 2.0 + 4.0);
    let mut sheet = Sheet::new(right.max(setting.width.sheet(360.0)));
    let top = sheet.header(&maps[0].title, told, setting.width) + 4.0;

    let mut bottom = top;
    for (index, (map, colours)) in maps.iter().zip(&colours).enumerate() {
        let [x, y] = step.map(|s| s * index as f64);
        let frame = Frame {
            left: left + x,
            top: top + y + OVER,
            right: left + x + size[0],
            bottom: top + y + OVER + size[1],
        };
        bar(&mut sheet, (map, colours), (frame, panel));
        let view = View {
            frame,
            window,
            points_per_metre,
            ground: Some(parts::TINT),
        };
        sheet.pictures.push(raster::picture(map, &view, colours));
        parts::draw(&mut sheet, &view, map);
        if arrangement == Arrangement::Above || index == 0 {
            axis::left(&mut sheet, frame, (&axes[1], &titles[1]), Grid::Without);
        }
        axis::bottom(&mut sheet, frame, (&axes[0], Some(&titles[0])));
        bottom = frame.bottom + BELOW;
    }
    let room = Frame {
        left: margin,
        top: bottom + 6.0,
        right: sheet.size[0] - margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &key(maps, &colours)) + 12.0;
    Ok(sheet)
}

/// The name of a map over its colours, and those over the map.
fn bar(sheet: &mut Sheet, (map, colours): (&PlanMap, &Axis), (frame, width): (Frame, f64)) {
    let top = frame.top - OVER + 18.0;
    let bar = Frame {
        left: frame.left,
        top,
        right: frame.left + width,
        bottom: top + BAR,
    };
    let lettering = Lettering::plain(LABEL, INK, Anchor::Start);
    let name = format!("{}, {}", map.quantity, map.unit);
    let name = lettering.shortened(&name, width);
    sheet.text([bar.left, top - 0.55 * TICK], name, lettering);
    sheet.pictures.push(Picture::level_bar(bar, map.ramp));
    // Labels without a title: the name stands above.
    axis::bottom(sheet, bar, (colours, Some("")));
    sheet.closed_within(bar, &corners(bar), Stroke::solid(NARROW, GREY));
}

/// One key for all: what they share is named once.
fn key(maps: &[&PlanMap], colours: &[Axis]) -> Vec<(Sample, String)> {
    let mut items: Vec<(Sample, String)> = Vec::new();
    for (map, colours) in maps.iter().zip(colours) {
        for item in parts::key(map, colours, Some(parts::TINT)) {
            if !items.contains(&item) {
                items.push(item);
            }
        }
    }
    items
}
