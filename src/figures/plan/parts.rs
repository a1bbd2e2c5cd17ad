//! The parts of a joint drawn over its field, and the key that names them.

use crate::figures::{
    axis::{self, Axis, Spread},
    legend::Sample,
    plan::{DetailKind, PlanMap, PlanShape, View, bolts, grown},
    ramp::Ramp,
    sheet::{ACCENT, Colour, INK, NARROW, PAPER, Sheet, Stroke, WIDE},
};

const HIDDEN: Stroke = Stroke::dashed(1.0, INK, &[5.0, 2.5]);
pub(super) const HEAD: Stroke = Stroke::solid(NARROW, INK);
pub(super) const HOLE: Stroke = Stroke::solid(WIDE, INK);
pub(super) const CONTACT: Stroke = Stroke::dashed(NARROW, INK, &[3.0, 2.2]);
const HEATED: Stroke = Stroke::dashed(WIDE, ACCENT, &[10.0, 2.5, 2.0, 2.5, 2.0, 2.5]);
const OPENING: Stroke = Stroke::solid(1.0, INK);
const FOOT: Stroke = Stroke::solid(NARROW, INK);
const RIB: Stroke = Stroke::dashed(NARROW, INK, &[8.0, 3.0]);
/// Laid under a line where the field may be as dark as the line.
const HALO: f64 = 1.0;

/// The ground of a map on which paper white has a meaning of its own.
pub(super) const TINT: Colour = Colour(0xE4, 0xE8, 0xEB);

/// Draws plates, their parts, heated zone, contact and bolts.
pub(in crate::figures) fn draw(sheet: &mut Sheet, view: &View, map: &PlanMap) {
    for detail in &map.details {
        if detail.kind == DetailKind::CutOut {
            let area = view.frame.area(&detail.shape.edge(view));
            sheet.area(area, view.ground.unwrap_or(PAPER));
        } else if map.ramp != Ramp::Sea {
            shape(sheet, view, &detail.shape, halo(detail_stroke(detail.kind)));
        }
        shape(sheet, view, &detail.shape, detail_stroke(detail.kind));
    }
    for (index, outline) in map.outlines.iter().enumerate().rev() {
        shape(sheet, view, &outline.shape, plate_stroke(index));
    }
    for line in &map.contact {
        let points: Vec<[f64; 2]> = line.iter().map(|p| view.point(*p)).collect();
        sheet.line_within(view.frame, &points, CONTACT);
    }
    for zone in &map.heated {
        if map.ramp != Ramp::Sea {
            shape(sheet, view, zone, halo(HEATED));
        }
        shape(sheet, view, zone, HEATED);
    }
    for bolt in &map.bolts {
        bolts::draw(sheet, view, bolt);
    }
    if map.bolts.len() > 1 {
        bolts::number(sheet, view, &map.bolts);
    }
}

/// Draws plates, their parts, heated zone and holes, no more: for a map too small for the rest.
pub(super) fn draw_small(sheet: &mut Sheet, view: &View, map: &PlanMap) {
    const FINE: Stroke = Stroke::solid(NARROW, INK);
    for detail in &map.details {
        if detail.kind == DetailKind::CutOut {
            sheet.area(view.frame.area(&detail.shape.edge(view)), PAPER);
        }
        shape(sheet, view, &detail.shape, FINE);
    }
    for (index, outline) in map.outlines.iter().enumerate().rev() {
        let stroke = if index == 0 { FINE } else { HIDDEN };
        shape(sheet, view, &outline.shape, stroke);
    }
    for zone in &map.heated {
        shape(sheet, view, zone, Stroke::solid(1.0, ACCENT));
    }
    for bolt in &map.bolts {
        let (centre, radius) = (bolt.at, bolt.hole_radius);
        let hole = PlanShape::Disc { centre, radius };
        sheet.area(view.frame.area(&hole.edge(view)), PAPER);
        shape(sheet, view, &hole, FINE);
    }
}

fn shape(sheet: &mut Sheet, view: &View, shape: &PlanShape, stroke: Stroke) {
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

fn detail_stroke(kind: DetailKind) -> Stroke {
    match kind {
        DetailKind::CutOut => OPENING,
        DetailKind::Foot => FOOT,
        DetailKind::Rib => RIB,
    }
}

fn halo(stroke: Stroke) -> Stroke {
    Stroke::solid(stroke.width + HALO, PAPER)
}

/// Samples with their names, lines first, then the colours that have a meaning of their own.
pub(in crate::figures) fn key(
    map: &PlanMap,
    colours: &Axis,
    ground: Option<Colour>,
) -> Vec<(Sample, String)> {
    let mut items: Vec<(Sample, String)> = map
        .outlines
        .iter()
        .enumerate()
        .map(|(index, outline)| (Sample::Line(plate_stroke(index)), outline.name.clone()))
        .collect();
    let any = |kind| map.details.iter().any(|detail| detail.kind == kind);
    for (kind, name) in [(DetailKind::Foot, "foot"), (DetailKind::Rib, "rib")] {
        if any(kind) {
            items.push((Sample::Line(detail_stroke(kind)), name.into()));
        }
    }
    if any(DetailKind::CutOut) {
        let sample = Sample::Edged(ground.unwrap_or(PAPER), OPENING);
        items.push((sample, "cut-out".into()));
    }
    if !map.bolts.is_empty() {
        items.push((Sample::Ring(HOLE), "hole".into()));
        items.push((Sample::Ring(HEAD), "head or washer".into()));
    }
    if !map.contact.is_empty() || map.bolts.iter().any(|bolt| bolt.contact_radius.is_some()) {
        items.push((Sample::Ring(CONTACT), "edge of contact".into()));
    }
    if !map.heated.is_empty() {
        items.push((Sample::Line(HEATED), "heated zone".into()));
    }
    items.extend(meaning(map, colours));
    if let Some(ground) = ground.filter(|_| bare(map)) {
        items.push((Sample::Patch(ground), "no face on face".into()));
    }
    items
}

/// Whether a part of the map, other than the holes, has no value.
fn bare(map: &PlanMap) -> bool {
    let [columns, rows] = map.size;
    let [left, lower, right, upper] = map.window;
    let cell = [
        (right - left) / columns as f64,
        (upper - lower) / rows as f64,
    ];
    let in_hole = |at: [f64; 2]| {
        map.bolts.iter().any(|bolt| {
            (at[0] - bolt.at[0]).hypot(at[1] - bolt.at[1])
                < bolt.hole_radius + cell[0].hypot(cell[1])
        })
    };
    map.values.iter().enumerate().any(|(index, value)| {
        value.is_nan()
            && !in_hole([
                left + ((index % columns) as f64 + 0.5) * cell[0],
                lower + ((index / columns) as f64 + 0.5) * cell[1],
            ])
    })
}

/// What the lightest colour stands for, where that is more than a small value.
fn meaning(map: &PlanMap, colours: &Axis) -> Option<(Sample, String)> {
    let under = |value: &f64| value * map.factor < colours.low * (1.0 - 1e-9);
    let lightest = Sample::Patch(map.ramp.colour(0.0));
    if colours.spread == Spread::Linear && map.values.contains(&0.0) {
        Some((
            lightest,
            match map.ramp {
                Ramp::Sea => format!("no {}", map.quantity),
                Ramp::Umber => "faces touch".into(),
                // No temperature is nothing.
                Ramp::Ember => return None,
            },
        ))
    } else if colours.spread == Spread::Logarithmic && map.values.iter().any(under) {
        let text = format!("below {} {}", axis::plain(colours.low), map.unit);
        Some((lightest, text))
    } else {
        None
    }
}
