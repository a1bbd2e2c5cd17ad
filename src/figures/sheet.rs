//! The sheet of paper: a list of marks in points, laid down once and replayed on any backend.

use crate::figures::{
    clip::Frame,
    fonts::Weight,
    lettering::{Anchor, Lettering, cleaned},
    picture::Picture,
    setting::Width,
};

/// Red, green and blue, sRGB.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Colour(pub(super) u8, pub(super) u8, pub(super) u8);

/// Lines and text.
pub(super) const INK: Colour = Colour(0x1C, 0x26, 0x30);
/// Secondary text and fine lines.
pub(super) const GREY: Colour = Colour(0x5E, 0x68, 0x71);
/// Hatching and grids.
pub(super) const FAINT: Colour = Colour(0xC9, 0xCF, 0xD4);
/// The one accent: limits, and where heat enters.
pub(super) const ACCENT: Colour = Colour(0xB5, 0x3F, 0x0E);
/// The ground.
pub(super) const PAPER: Colour = Colour(0xFF, 0xFF, 0xFF);

/// Wide line of engineering drawings, points.
pub(super) const WIDE: f64 = 1.5;
/// Narrow line, half the wide one (ISO 128-2).
pub(super) const NARROW: f64 = 0.75;

/// Text size of labels, points.
pub(super) const LABEL: f64 = 11.5;

/// How a line is drawn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Stroke {
    /// Width, points.
    pub(super) width: f64,
    /// Colour.
    pub(super) colour: Colour,
    /// Lengths of dash and gap in turn, points; empty for a continuous line.
    pub(super) dash: &'static [f64],
}

impl Stroke {
    /// A continuous line.
    pub(super) const fn solid(width: f64, colour: Colour) -> Self {
        Self {
            width,
            colour,
            dash: &[],
        }
    }

    /// A line of dashes.
    pub(super) const fn dashed(width: f64, colour: Colour, dash: &'static [f64]) -> Self {
        Self {
            width,
            colour,
            dash,
        }
    }
}

/// One mark on the sheet.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Mark {
    /// A line through points.
    Line(Vec<[f64; 2]>, f64, Colour),
    /// A filled area.
    Area(Vec<[f64; 2]>, Colour),
    /// A filled circle: centre and radius.
    Disc([f64; 2], f64, Colour),
    /// A circle: centre, radius and width of the line.
    Ring([f64; 2], f64, f64, Colour),
    /// A text at a place.
    Text([f64; 2], String, Lettering),
}

/// The sheet.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Sheet {
    /// Width and height, points.
    pub(super) size: [f64; 2],
    /// What the figure is about, for readers who do not see it.
    pub(super) title: String,
    /// Fields, which lie under every mark.
    pub(super) pictures: Vec<Picture>,
    /// Marks, later ones on top.
    pub(super) marks: Vec<Mark>,
}

impl Sheet {
    /// An empty sheet of this width; the height follows from what is drawn.
    pub(super) fn new(width: f64) -> Self {
        Self {
            size: [width, 0.0],
            title: String::new(),
            pictures: Vec::new(),
            marks: Vec::new(),
        }
    }

    /// Title in bold and what is shown below it; returns the height used.
    ///
    /// What is too long for a line takes a second one, on a narrow sheet up to four.
    pub(super) fn header(&mut self, title: &str, subtitle: &str, width: Width) -> f64 {
        let margin = width.margin();
        let bold = Lettering {
            weight: Weight::Bold,
            ..Lettering::plain(14.5, INK, Anchor::Start)
        };
        let small = Lettering::plain(LABEL, GREY, Anchor::Start);
        let room = self.size[0] - 2.0 * margin;
        let title = cleaned(title);
        self.title = cleaned(&format!("{title}: {subtitle}"));
        let mut baseline = 12.0;
        for line in bold.wrapped(&title, room, 2) {
            baseline += 18.0;
            self.text([margin, baseline], line, bold);
        }
        baseline += 2.0;
        let most = match width {
            Width::Full => 2,
            Width::Narrow => 4,
        };
        for line in small.wrapped(subtitle, room, most) {
            baseline += 15.0;
            self.text([margin, baseline], line, small);
        }
        baseline + 10.0
    }

    /// A line through the points.
    pub(super) fn line(&mut self, points: &[[f64; 2]], stroke: Stroke) {
        if stroke.dash.is_empty() {
            self.stroke(points.to_vec(), stroke);
            return;
        }
        for piece in dashes(points, stroke.dash) {
            self.stroke(piece, stroke);
        }
    }

    /// The part of a line within a frame.
    pub(super) fn line_within(&mut self, frame: Frame, points: &[[f64; 2]], stroke: Stroke) {
        for piece in frame.line(points) {
            self.line(&piece, stroke);
        }
    }

    /// A closed line with sharp corners.
    pub(super) fn closed_within(&mut self, frame: Frame, points: &[[f64; 2]], stroke: Stroke) {
        const STRAIGHT: f64 = 1e-9;
        if points.len() < 2 {
            return;
        }
        let upright = (0..points.len()).all(|k| {
            let (a, b) = (points[k], points[(k + 1) % points.len()]);
            (a[0] - b[0]).abs().min((a[1] - b[1]).abs()) < STRAIGHT
        });
        if upright {
            // Side by side and half a line longer each, which the pixel backend keeps straight.
            for k in 0..points.len() {
                let (a, b) = (points[k], points[(k + 1) % points.len()]);
                let reach = [0, 1].map(|axis| {
                    let step = b[axis] - a[axis];
                    if step.abs() < STRAIGHT {
                        0.0
                    } else {
                        step.signum() * stroke.width / 2.0
                    }
                });
                let from = [a[0] - reach[0], a[1] - reach[1]];
                let to = [b[0] + reach[0], b[1] + reach[1]];
                let around = Frame {
                    left: frame.left - stroke.width,
                    top: frame.top - stroke.width,
                    right: frame.right + stroke.width,
                    bottom: frame.bottom + stroke.width,
                };
                self.line_within(around, &[from, to], stroke);
            }
            return;
        }
        // The seam lies in the middle of a side, so that every corner is a joint, and on a sloping
        // one, where the pixel backend shows no step between the two halves.
        let count = points.len();
        let slopes = |k: &usize| {
            let (a, b) = (points[*k], points[(*k + 1) % count]);
            (a[0] - b[0]).abs().min((a[1] - b[1]).abs()) >= STRAIGHT
        };
        let from = (0..count).find(slopes).unwrap_or(0);
        let to = (from + 1) % count;
        let seam = [0, 1].map(|axis| f64::midpoint(points[from][axis], points[to][axis]));
        let mut path = vec![seam];
        path.extend((0..count).map(|k| points[(to + k) % count]));
        path.push(seam);
        self.line_within(frame, &path, stroke);
    }

    /// The part of a circle within a frame.
    pub(super) fn circle_within(
        &mut self,
        frame: Frame,
        (centre, radius): ([f64; 2], f64),
        stroke: Stroke,
    ) {
        let corners = [-radius, radius].map(|r| [centre[0] + r, centre[1] + r]);
        if stroke.dash.is_empty() && corners.iter().all(|&corner| frame.holds(corner)) {
            self.marks
                .push(Mark::Ring(centre, radius, stroke.width, stroke.colour));
        } else {
            self.closed_within(frame, &circle(centre, radius), stroke);
        }
    }

    /// A filled area.
    pub(super) fn area(&mut self, points: Vec<[f64; 2]>, colour: Colour) {
        if points.len() > 2 {
            self.marks.push(Mark::Area(points, colour));
        }
    }

    /// A filled circle.
    pub(super) fn disc(&mut self, centre: [f64; 2], radius: f64, colour: Colour) {
        self.marks.push(Mark::Disc(centre, radius, colour));
    }

    /// A text; the place is its anchor on the baseline.
    pub(super) fn text(&mut self, at: [f64; 2], content: impl Into<String>, lettering: Lettering) {
        let content = cleaned(&content.into());
        if !content.is_empty() {
            self.marks.push(Mark::Text(at, content, lettering));
        }
    }

    fn stroke(&mut self, points: Vec<[f64; 2]>, stroke: Stroke) {
        if points.len() > 1 {
            self.marks
                .push(Mark::Line(points, stroke.width, stroke.colour));
        }
    }
}

/// The circle as a closed ring of points, fine enough that no corner shows.
pub(super) fn circle(centre: [f64; 2], radius: f64) -> Vec<[f64; 2]> {
    let count = (radius.abs().sqrt() * 10.0).clamp(24.0, 180.0) as usize;
    (0..count)
        .map(|k| {
            let angle = std::f64::consts::TAU * k as f64 / count as f64;
            [
                centre[0] + radius * angle.cos(),
                centre[1] - radius * angle.sin(),
            ]
        })
        .collect()
}

/// Cuts a line into its dashes.
fn dashes(points: &[[f64; 2]], pattern: &[f64]) -> Vec<Vec<[f64; 2]>> {
    let mut pieces = Vec::new();
    let (mut index, mut left) = (0, pattern[0]);
    let mut piece: Vec<[f64; 2]> = points.first().copied().into_iter().collect();
    for pair in points.windows(2) {
        let (mut from, to) = (pair[0], pair[1]);
        let mut rest = (to[0] - from[0]).hypot(to[1] - from[1]);
        while rest > left {
            let t = left / rest;
            from = [0, 1].map(|k| from[k] + t * (to[k] - from[k]));
            rest -= left;
            if index % 2 == 0 {
                piece.push(from);
                pieces.push(std::mem::take(&mut piece));
            } else {
                piece = vec![from];
            }
            index += 1;
            left = pattern[index % pattern.len()];
        }
        left -= rest;
        if index % 2 == 0 {
            piece.push(to);
        }
    }
    if piece.len() > 1 {
        pieces.push(piece);
    }
    pieces
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn dashes_cover_their_share_of_the_line() {
        let pieces = dashes(&[[0.0, 0.0], [50.0, 0.0], [50.0, 50.0]], &[3.0, 2.0]);
        let drawn: f64 = pieces
            .iter()
            .flat_map(|p| p.windows(2))
            .map(|p| (p[1][0] - p[0][0]).hypot(p[1][1] - p[0][1]))
            .sum();
        // The line is a whole number of patterns long, so the share is exact but for rounding.
        assert!((drawn - 60.0).abs() < 1e-9);
    }
}
