//! The joint as drawings show it: in plan, and cut along a row of bolts below it, to one scale.

use crate::{
    estimate::{Solid, StackOutline},
    figures::{
        FigureError,
        axis::{self, Axis, BELOW, Grid},
        clip::Frame,
        drawable,
        fonts::Weight,
        legend::{Sample, corners, legend},
        lettering::{Anchor, Lettering},
        plan::{PlanMap, View, extent, parts},
        setting::{NARROW_SHEET, Setting, Width},
        sheet::{ACCENT, Colour, INK, LABEL, NARROW, PAPER, Sheet, Stroke, WIDE},
    },
    resistance::columns::Across,
    units::{Shown, Unit},
};

/// The joint with what is needed to draw it.
#[derive(Clone, Debug, PartialEq)]
pub struct JointPlot {
    /// What is told under the title.
    pub told: String,
    /// The plan: plates, bolts, heated zones; its field is not drawn and may be empty.
    pub plan: PlanMap,
    /// The cut; none where the joint has no bolts to cut through.
    pub cut: Option<JointCut>,
}

/// The stack cut along a row of bolts.
#[derive(Clone, Debug, PartialEq)]
pub struct JointCut {
    /// Plates, their solid parts, and where heat enters.
    pub stack: StackOutline,
    /// What is written beside each plate, warm side first.
    pub labels: Vec<String>,
    /// The bolts that the cut meets.
    pub bolts: Vec<CutBolt>,
}

/// A bolt on the cut.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CutBolt {
    /// Place of its axis along the cut, m.
    pub along: f64,
    /// Nominal diameter of the thread, m.
    pub diameter: f64,
    /// Outer radius under the head, washer included, m.
    pub seat_radius: f64,
    /// Thickness of all washers, m.
    pub washers: f64,
    /// Heights of the lower and the upper face between which it clamps, m.
    pub faces: [f64; 2],
    /// Whether the head sits on the first plate.
    pub head_on_top: bool,
    /// The head.
    pub head: CutHead,
    /// The far end.
    pub end: CutEnd,
}

/// The shape of a head.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum CutHead {
    /// A cylinder with a socket.
    Cylinder,
    /// A hexagon.
    Hexagon,
    /// A cone flush with the face.
    Countersunk,
}

/// How the far end of a bolt holds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum CutEnd {
    /// By a nut, with washers under it.
    Nut {
        /// Whether a part of the washers lies under it.
        washer: bool,
    },
    /// In a thread of the far plate, where it ends so far below the face under the head, m.
    Thread(f64),
}

/// Largest width and height of the plan, points.
const WIDEST: [f64; 2] = [560.0, 360.0];
/// Least and most room beside the cut for what is written of the plates, points.
const BESIDE: [f64; 2] = [80.0, 260.0];
/// What is written of the plates.
const WRITTEN: Lettering = Lettering::plain(LABEL - 1.0, INK, Anchor::Start);
/// Height of a head over the diameter of its thread: socket (ISO 4762) and hexagon (ISO 4014), and that
/// of a nut (ISO 4032), rounded; a drawing shows them, nothing is computed with them.
const SOCKET: f64 = 1.0;
const HEXAGON: f64 = 0.65;
const NUT: f64 = 0.85;
/// Width of a head or nut over the diameter of its thread.
const HEAD_WIDTH: f64 = 1.55;
const EDGE: Stroke = Stroke::solid(WIDE, INK);
const FINE: Stroke = Stroke::solid(NARROW, INK);
const AXIS: Stroke = Stroke::dashed(NARROW, INK, &[9.0, 2.0, 1.5, 2.0]);
const CUT: Stroke = Stroke::dashed(NARROW, INK, &[14.0, 3.0, 2.0, 3.0]);
const HEATED: Stroke = Stroke::solid(3.0, ACCENT);
const HATCH: Colour = Colour(0x8D, 0x96, 0x9E);
const STEEL: Colour = Colour(0xE4, 0xE8, 0xEB);

/// Draws plan and cut.
pub(super) fn draw(plot: &JointPlot, setting: Setting) -> Result<Sheet, FigureError> {
    let window = plot.plan.window;
    let [wide, tall] = extent(window)?;
    let (units, margin) = (setting.units, setting.width.margin());
    let length = units.unit(Shown::Length);
    let axes = [0, 1].map(|k| Axis::over(length.of(window[k]), length.of(window[k + 2])));
    let along = plot
        .cut
        .as_ref()
        .map_or(0.0, |cut| cut.stack.range[1] - cut.stack.range[0]);
    let points_per_metre = match setting.width {
        Width::Full => (WIDEST[0] / wide).min(WIDEST[1] / tall),
        Width::Narrow => {
            let side = axis::side_room(&axes[1], WIDEST[1]);
            let room = NARROW_SHEET - 2.0 * margin - side - 10.0;
            (room / wide.max(along)).min(WIDEST[1] / tall)
        }
    };
    let (width, height) = (wide * points_per_metre, tall * points_per_metre);
    let along = along * points_per_metre;
    let left = margin + axis::side_room(&axes[1], height);
    let labels = plot.cut.iter().flat_map(|cut| &cut.labels);
    let labels: Vec<String> = labels.map(|label| units.restated(label)).collect();
    let beside = labels.iter().map(|label| WRITTEN.width(label) + 20.0);
    let beside = beside.fold(BESIDE[0], f64::max).min(BESIDE[1]);
    let mut sheet = Sheet::new(match setting.width {
        Width::Full => (left + width.max(along) + beside + margin).max(360.0),
        Width::Narrow => (left + width.max(along) + margin).max(NARROW_SHEET),
    });
    let top = sheet.header(&plot.plan.title, &plot.told, setting.width) + 14.0;
    let frame = Frame {
        left,
        top,
        right: left + width,
        bottom: top + height,
    };
    let view = View {
        frame,
        window,
        points_per_metre,
        ground: None,
    };
    parts::draw(&mut sheet, &view, &plot.plan);
    axis::left(
        &mut sheet,
        frame,
        (&axes[1], &format!("y, {}", length.name)),
        Grid::Without,
    );
    axis::bottom(
        &mut sheet,
        frame,
        (&axes[0], Some(&format!("x, {}", length.name))),
    );
    let mut bottom = frame.bottom + BELOW;
    let mut items = parts::key(&plot.plan, &Axis::over(0.0, 1.0), None);
    let beside_cut = match setting.width {
        Width::Full => &labels[..],
        Width::Narrow => &[],
    };
    if let Some(cut) = &plot.cut {
        line_of_cut(&mut sheet, &view, cut.stack.across);
        bottom = section(
            &mut sheet,
            (cut, beside_cut, length),
            (left, bottom + 8.0, points_per_metre),
        )?;
        if setting.width == Width::Narrow {
            bottom = listed(&mut sheet, (left, bottom), &labels);
        }
        items.push((Sample::Line(CUT), "line of the cut".to_owned()));
        items.push((Sample::Hatch, "cut plate".to_owned()));
    }
    let room = Frame {
        left: margin,
        top: bottom + 8.0,
        right: sheet.size[0] - margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &items) + 12.0;
    Ok(sheet)
}

/// What each plate is, from above, below the cut; returns the lower edge.
fn listed(sheet: &mut Sheet, (left, top): (f64, f64), labels: &[String]) -> f64 {
    let mut y = top + 8.0;
    let room = sheet.size[0] - left - 12.0;
    let all = std::iter::once("plates from above:").chain(labels.iter().map(String::as_str));
    for label in all {
        for line in WRITTEN.wrapped(label, room, 2) {
            y += 14.0;
            sheet.text([left, y], line, WRITTEN);
        }
    }
    y + 6.0
}

/// Where the plan is cut, with its letters.
fn line_of_cut(sheet: &mut Sheet, view: &View, across: Across) {
    let frame = view.frame;
    let [left, lower, right, upper] = view.window;
    let (ends, anchors) = match across {
        Across::X(y) => ([[left, y], [right, y]], [[-9.0, 4.0], [9.0, 4.0]]),
        Across::Y(x) => ([[x, upper], [x, lower]], [[0.0, -5.0], [0.0, 14.0]]),
    };
    let ends = ends.map(|end| view.point(end));
    let around = Frame {
        left: frame.left - 4.0,
        top: frame.top - 4.0,
        right: frame.right + 4.0,
        bottom: frame.bottom + 4.0,
    };
    sheet.line_within(around, &ends, CUT);
    let letter = Lettering {
        weight: Weight::Bold,
        ..Lettering::plain(LABEL, INK, Anchor::Middle)
    };
    // On the side of the axis its labels stand, so that only the far letter is set there.
    for (end, [dx, dy]) in ends.iter().zip(anchors).skip(match across {
        Across::X(_) => 1,
        Across::Y(_) => 0,
    }) {
        if matches!(across, Across::Y(_)) && dy > 0.0 {
            continue;
        }
        sheet.text([end[0] + dx, end[1] + dy], "A", letter);
    }
}

/// Where things lie on the cut.
struct Place {
    left: f64,
    base: f64,
    from: f64,
    scale: f64,
}

impl Place {
    fn x(&self, along: f64) -> f64 {
        self.left + (along - self.from) * self.scale
    }

    fn y(&self, height: f64) -> f64 {
        self.base - height * self.scale
    }

    fn frame(&self, along: [f64; 2], heights: [f64; 2]) -> Frame {
        Frame {
            left: self.x(along[0]),
            right: self.x(along[1]),
            top: self.y(heights[1]),
            bottom: self.y(heights[0]),
        }
    }
}

/// The cut below the plan; returns the lower edge.
fn section(
    sheet: &mut Sheet,
    (cut, written, length): (&JointCut, &[String], Unit),
    (left, top, scale): (f64, f64, f64),
) -> Result<f64, FigureError> {
    let stack = &cut.stack;
    let heights = stack
        .plates
        .iter()
        .flat_map(|plate| plate.heights)
        .chain(stack.range);
    for value in heights {
        drawable(value, "the cut")?;
    }
    let highest = stack.plates.first().map_or(0.0, |plate| plate.heights[1]);
    for face in cut.bolts.iter().flat_map(|bolt| bolt.faces) {
        drawable(face, "the cut")?;
    }
    let above = cut
        .bolts
        .iter()
        .map(|bolt| reach(bolt, Reach::Above) + bolt.faces[1] - highest);
    let below = cut
        .bolts
        .iter()
        .map(|bolt| reach(bolt, Reach::Below) - bolt.faces[0]);
    let above = above.fold(0.0, f64::max) * scale;
    let below = below.fold(0.0, f64::max) * scale;
    let name = Lettering::plain(LABEL, INK, Anchor::Start);
    let bold = Lettering {
        weight: Weight::Bold,
        ..name
    };
    let baseline = top + 12.0;
    sheet.text([left, baseline], "A – A", bold);
    let at = |place: f64| format!("{} {}", axis::plain(length.of(place)), length.name);
    let told = match stack.across {
        Across::X(y) => format!("cut at y = {}, true to scale", at(y)),
        Across::Y(x) => format!("cut at x = {}, along y, true to scale", at(x)),
    };
    sheet.text([left + 40.0, baseline], told, name);
    let base = baseline + 14.0 + above + highest * scale;
    let place = Place {
        left,
        base,
        from: stack.range[0],
        scale,
    };
    for (index, plate) in stack.plates.iter().enumerate() {
        for part in &plate.solid {
            solid(sheet, &place, (part, index));
        }
    }
    for [from, to] in &stack.heated {
        let y = place.y(highest) - 3.0;
        sheet.line(&[[place.x(*from), y], [place.x(*to), y]], HEATED);
    }
    for bolt in &cut.bolts {
        fastener(sheet, &place, bolt);
    }
    labels(sheet, &place, (cut, written));
    Ok(base + below + 6.0)
}

/// A part of a plate: hatched, each plate its own way, as drawings tell parts apart.
fn solid(sheet: &mut Sheet, place: &Place, (part, index): (&Solid, usize)) {
    let frame = place.frame(part.along, part.heights);
    let pitch = 5.0 + 1.5 * (index / 2) as f64;
    let rising = index.is_multiple_of(2);
    let count = ((frame.width() + frame.height()) / pitch) as usize;
    for k in 1..=count {
        let x = frame.left + k as f64 * pitch;
        let (high, low) = if rising {
            (frame.top, frame.bottom)
        } else {
            (frame.bottom, frame.top)
        };
        let line = [[x, high], [x - frame.height(), low]];
        sheet.line_within(frame, &line, Stroke::solid(0.5, HATCH));
    }
    let around = Frame {
        left: frame.left - 2.0,
        top: frame.top - 2.0,
        right: frame.right + 2.0,
        bottom: frame.bottom + 2.0,
    };
    sheet.closed_within(around, &corners(frame), EDGE);
}

/// Which end of the stack.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Reach {
    Above,
    Below,
}

/// How far a bolt stands out of the stack, m.
fn reach(bolt: &CutBolt, side: Reach) -> f64 {
    let head = match bolt.head {
        CutHead::Cylinder => SOCKET * bolt.diameter,
        CutHead::Hexagon => HEXAGON * bolt.diameter,
        CutHead::Countersunk => 0.0,
    };
    if (side == Reach::Above) == bolt.head_on_top {
        head + washer(bolt)[0]
    } else {
        match bolt.end {
            CutEnd::Nut { .. } => (NUT + 0.3) * bolt.diameter + washer(bolt)[1],
            CutEnd::Thread(_) => 0.0,
        }
    }
}

/// Thickness of the washers under head and nut, m.
fn washer(bolt: &CutBolt) -> [f64; 2] {
    match bolt.end {
        CutEnd::Nut { washer: true } => [0.5 * bolt.washers; 2],
        _ => [bolt.washers, 0.0],
    }
}

/// A bolt: drawn whole, as drawings do not cut bolts.
fn fastener(sheet: &mut Sheet, place: &Place, bolt: &CutBolt) {
    // Heights from the face under the head, outwards positive, whichever way the bolt looks.
    let [lower, upper] = bolt.faces;
    let depth = upper - lower;
    let (face, sign) = if bolt.head_on_top {
        (upper, 1.0)
    } else {
        (lower, -1.0)
    };
    let d = bolt.diameter;
    let mut block = |half: f64, from: f64, to: f64, fill: Colour| {
        let ends = [face + sign * from, face + sign * to];
        let heights = [ends[0].min(ends[1]), ends[0].max(ends[1])];
        let frame = place.frame([bolt.along - half, bolt.along + half], heights);
        sheet.area(corners(frame), fill);
        let around = Frame {
            left: frame.left - 2.0,
            top: frame.top - 2.0,
            right: frame.right + 2.0,
            bottom: frame.bottom + 2.0,
        };
        sheet.closed_within(around, &corners(frame), FINE);
    };
    let [under_head, under_nut] = washer(bolt);
    let end = match bolt.end {
        CutEnd::Nut { .. } => depth + under_nut + (NUT + 0.3) * d,
        CutEnd::Thread(end) => end.min(depth),
    };
    block(0.5 * d, 0.0, -end, STEEL);
    if under_head > 0.0 {
        block(bolt.seat_radius, 0.0, under_head, PAPER);
    }
    let head = match bolt.head {
        CutHead::Cylinder => SOCKET * d,
        CutHead::Hexagon => HEXAGON * d,
        CutHead::Countersunk => 0.0,
    };
    if head > 0.0 {
        let half = (0.5 * HEAD_WIDTH * d).min(bolt.seat_radius.max(0.75 * d));
        block(half, under_head, under_head + head, STEEL);
    } else {
        block(bolt.seat_radius, -0.5 * d, 0.0, STEEL);
    }
    if let CutEnd::Nut { .. } = bolt.end {
        if under_nut > 0.0 {
            block(bolt.seat_radius, -depth, -depth - under_nut, PAPER);
        }
        let from = -depth - under_nut;
        block(0.5 * HEAD_WIDTH * d, from, from - NUT * d, STEEL);
    }
    let top = place.y(upper) - reach(bolt, Reach::Above) * place.scale - 5.0;
    let bottom = place.y(lower) + reach(bolt, Reach::Below) * place.scale + 5.0;
    let x = place.x(bolt.along);
    sheet.line(&[[x, top], [x, bottom]], AXIS);
}

/// What each plate is, at the right end of the cut, apart from each other.
fn labels(sheet: &mut Sheet, place: &Place, (cut, written): (&JointCut, &[String])) {
    let right = place.x(cut.stack.range[1]);
    let mut free = f64::NEG_INFINITY;
    for (plate, label) in cut.stack.plates.iter().zip(written) {
        let end = plate
            .solid
            .iter()
            .map(|part| place.x(part.along[1]))
            .fold(f64::NEG_INFINITY, f64::max);
        let middle = place.y(0.5 * (plate.heights[0] + plate.heights[1]));
        let y = middle.max(free + 14.0);
        free = y;
        if end.is_finite() {
            sheet.line(&[[end + 2.0, middle], [right + 12.0, y]], FINE);
        }
        let text = WRITTEN.shortened(label, BESIDE[1] - 18.0);
        sheet.text([right + 16.0, y + 4.0], text, WRITTEN);
    }
}
