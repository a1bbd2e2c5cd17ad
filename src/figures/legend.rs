//! The key under a figure: a sample of each kind of line with its name.

use crate::figures::{
    clip::Frame,
    lettering::{Anchor, Lettering},
    sheet::{Colour, GREY, INK, LABEL, NARROW, PAPER, Sheet, Stroke},
};

/// What a name stands beside.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Sample {
    /// A line.
    Line(Stroke),
    /// A band with its middle line.
    Band(Colour, Stroke),
    /// A hatched area.
    Hatch,
    /// A circle with the stroke.
    Ring(Stroke),
    /// A dot.
    Dot(Colour),
    /// A hollow dot.
    HollowDot(Colour),
    /// A square with a colour of the field.
    Patch(Colour),
    /// A square with a colour of its own and its line.
    Edged(Colour, Stroke),
}

const SAMPLE: f64 = 24.0;
const ROW: f64 = 17.0;
/// From a line of a name to its next, points.
const LINE: f64 = 13.0;
const TEXT: Lettering = Lettering::plain(LABEL - 1.0, INK, Anchor::Start);

/// Sets the key in rows from the upper left corner of the room; returns its lower edge.
pub(super) fn legend(sheet: &mut Sheet, room: Frame, items: &[(Sample, String)]) -> f64 {
    let mut left = room.left;
    let mut middle = room.top + ROW / 2.0;
    for (sample, name) in items {
        let lines = TEXT.wrapped(name, room.width() - SAMPLE - 6.0, 2);
        let widest = lines
            .iter()
            .map(|line| TEXT.width(line))
            .fold(0.0, f64::max);
        let width = SAMPLE + 6.0 + widest;
        if left > room.left && left + width > room.right {
            left = room.left;
            middle += ROW;
        }
        let place = Frame {
            left,
            top: middle - 5.0,
            right: left + SAMPLE,
            bottom: middle + 5.0,
        };
        draw(sheet, place, *sample);
        let at = [left + SAMPLE + 6.0, middle + 0.36 * TEXT.size];
        for (index, line) in lines.iter().enumerate() {
            let below = LINE * index as f64;
            sheet.text([at[0], at[1] + below], line.clone(), TEXT);
        }
        left += width + 18.0;
        if lines.len() > 1 {
            // Nothing stands beside a name of two lines.
            left = room.right;
            middle += LINE;
        }
    }
    if items.is_empty() {
        room.top
    } else {
        middle + ROW / 2.0
    }
}

fn draw(sheet: &mut Sheet, place: Frame, sample: Sample) {
    let middle = f64::midpoint(place.top, place.bottom);
    let centre = [f64::midpoint(place.left, place.right), middle];
    let across = [[place.left, middle], [place.right, middle]];
    match sample {
        Sample::Line(stroke) => sheet.line(&across, stroke),
        Sample::Band(colour, stroke) => {
            sheet.area(corners(place), colour);
            sheet.line(&across, stroke);
        }
        Sample::Hatch => {
            hatch(sheet, place);
            sheet.closed_within(place, &corners(place), Stroke::solid(NARROW, GREY));
        }
        Sample::Ring(stroke) => {
            let around = Frame {
                top: place.top - 2.0,
                bottom: place.bottom + 2.0,
                ..place
            };
            sheet.circle_within(around, (centre, 5.5), stroke);
        }
        Sample::Dot(colour) => sheet.disc(centre, 3.0, colour),
        Sample::HollowDot(colour) => hollow_dot(sheet, centre, colour),
        Sample::Patch(colour) => patch(sheet, place, (colour, Stroke::solid(NARROW, GREY))),
        Sample::Edged(colour, stroke) => patch(sheet, place, (colour, stroke)),
    }
}

fn patch(sheet: &mut Sheet, place: Frame, (colour, stroke): (Colour, Stroke)) {
    let middle = f64::midpoint(place.left, place.right);
    let square = Frame {
        left: middle - 6.0,
        right: middle + 6.0,
        ..place
    };
    sheet.area(corners(square), colour);
    sheet.closed_within(square, &corners(square), stroke);
}

/// A dot with a white middle, for one point among the points of a curve.
pub(super) fn hollow_dot(sheet: &mut Sheet, centre: [f64; 2], colour: Colour) {
    sheet.disc(centre, 4.5, colour);
    sheet.disc(centre, 2.5, PAPER);
}

/// The corners of a frame in turn.
pub(super) fn corners(frame: Frame) -> Vec<[f64; 2]> {
    vec![
        [frame.left, frame.top],
        [frame.right, frame.top],
        [frame.right, frame.bottom],
        [frame.left, frame.bottom],
    ]
}

/// Fills a frame with lines at 45°, as drawings mark cut or barred parts.
pub(super) fn hatch(sheet: &mut Sheet, frame: Frame) {
    const PITCH: f64 = 7.0;
    let stroke = Stroke::solid(NARROW, Colour(0xA9, 0xB1, 0xB8));
    let count = ((frame.width() + frame.height()) / PITCH) as usize;
    for k in 1..=count {
        let x = frame.left + k as f64 * PITCH;
        let line = [[x, frame.top], [x - frame.height(), frame.bottom]];
        sheet.line_within(frame, &line, stroke);
    }
}
