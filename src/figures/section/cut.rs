//! The cut itself: colours, edges, faces that touch, bolts, heated zone.

use crate::{
    estimate::StackSection,
    figures::{
        clip::Frame,
        legend::Sample,
        lettering::{Anchor, Lettering},
        picture::{NOTHING, Picture},
        ramp::{self, Ramp},
        section::{View, place_stroke, sample},
        sheet::{ACCENT, INK, LABEL, NARROW, PAPER, Sheet, Stroke},
    },
};

/// Pixels to the point; the final image has as many.
const FINENESS: f64 = 2.0;
const EDGE: Stroke = Stroke::solid(1.0, INK);
const TOUCHING: Stroke = Stroke::solid(2.4, INK);
const PARTED: Stroke = Stroke::solid(1.6, PAPER);
const AXIS: Stroke = Stroke::dashed(NARROW, INK, &[9.0, 2.0, 1.5, 2.0]);
const HEATED: Stroke = Stroke::solid(3.0, ACCENT);
const PLACE: f64 = 0.9;

/// Draws the cut into its frame.
pub(super) fn draw(sheet: &mut Sheet, view: &View, section: &StackSection) {
    sheet.pictures.push(picture(view, section));
    for part in section.plates.iter().flat_map(|plate| &plate.solid) {
        let [left, right] = part.along.map(|at| view.x(at));
        let [bottom, top] = part.heights.map(|at| view.y(at));
        let corners = [[left, top], [right, top], [right, bottom], [left, bottom]];
        sheet.closed_within(around(view, 1.0), &corners, EDGE);
    }
    for [from, to] in &section.heated {
        let y = view.frame.top - 3.0;
        sheet.line(&[[view.x(*from), y], [view.x(*to), y]], HEATED);
    }
    for (index, through) in section.through.iter().enumerate() {
        let x = view.x(through.along);
        let stroke = Stroke {
            width: PLACE,
            ..place_stroke(index)
        };
        let ends = [view.frame.top, view.frame.bottom];
        // Laid on paper, since the plate may be as dark as the line.
        let halo = Stroke::solid(PLACE + 1.4, PAPER);
        sheet.line(&ends.map(|y| [x, y]), halo);
        sheet.line(&ends.map(|y| [x, y]), stroke);
    }
    faces(sheet, view, section);
    bolts(sheet, view, section);
}

/// Where the faces touch a broad line, where they part a gap.
fn faces(sheet: &mut Sheet, view: &View, section: &StackSection) {
    for pair in section.plates.windows(2) {
        let Some(height) = pair[1].section.heights.last() else {
            continue;
        };
        let y = view.y(*height);
        for part in &pair[1].solid {
            if part.heights[1] >= height * (1.0 - 1e-9) {
                let [left, right] = part.along.map(|at| view.x(at));
                sheet.line(&[[left + 0.5, y], [right - 0.5, y]], PARTED);
            }
        }
    }
    let Some(height) = section
        .plates
        .get(1)
        .and_then(|plate| plate.section.heights.last())
    else {
        return;
    };
    let y = view.y(*height);
    for [from, to] in &section.touching {
        sheet.line(&[[view.x(*from), y], [view.x(*to), y]], TOUCHING);
    }
}

/// Axes of the bolts with their numbers over the cut.
fn bolts(sheet: &mut Sheet, view: &View, section: &StackSection) {
    let lettering = Lettering::plain(LABEL - 2.0, INK, Anchor::Middle);
    let mut taken = f64::NEG_INFINITY;
    for bolt in &section.bolts {
        let x = view.x(bolt.along);
        let ends = [view.frame.top - 8.0, view.frame.bottom];
        sheet.line(&ends.map(|y| [x, y]), AXIS);
        let number = bolt.number.to_string();
        let half = lettering.width(&number) / 2.0 + 2.0;
        if x - half > taken {
            sheet.text([x, view.frame.top - 11.0], number, lettering);
            taken = x + half;
        }
    }
}

/// Names of what the cut shows.
pub(super) fn key(section: &StackSection) -> Vec<(Sample, String)> {
    let mut items = Vec::new();
    if !section.touching.is_empty() {
        items.push(sample(TOUCHING, "faces touch"));
    }
    if !section.heated.is_empty() {
        items.push(sample(HEATED, "heated zone"));
    }
    if !section.bolts.is_empty() {
        items.push(sample(AXIS, "axis of a bolt"));
    }
    items
}

fn around(view: &View, by: f64) -> Frame {
    Frame {
        left: view.frame.left - by,
        top: view.frame.top - by,
        right: view.frame.right + by,
        bottom: view.frame.bottom + by,
    }
}

/// Temperatures of what is solid; nothing else is coloured.
fn picture(view: &View, section: &StackSection) -> Picture {
    let size = [view.frame.width(), view.frame.height()]
        .map(|length| ((length * FINENESS).round() as usize).max(1));
    let mut indices = Vec::with_capacity(size[0] * size[1]);
    for row in 0..size[1] {
        let [low, high] = view.heights;
        let height = high - (high - low) * (row as f64 + 0.5) / size[1] as f64;
        for column in 0..size[0] {
            let share = (column as f64 + 0.5) / size[0] as f64;
            let along = view.along[0] + share * (view.along[1] - view.along[0]);
            let mut plates = section.plates.iter();
            let rise = plates.find_map(|plate| plate.rise_at([along, height]));
            indices.push(match rise {
                Some(rise) => ramp::step(view.colours.place(rise * view.factor)) as u8 + 1,
                None => NOTHING,
            });
        }
    }
    Picture {
        place: view.frame,
        size,
        indices,
        ramp: Ramp::Ember,
        ground: None,
    }
}
