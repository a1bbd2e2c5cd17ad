//! Evidence: what was expected and what the program gives, row by row, misses included.

use crate::figures::{
    FigureError,
    axis::{self, Axis, BELOW},
    clip::Frame,
    drawable,
    fonts::Weight,
    legend::{Sample, corners, legend},
    lettering::{Anchor, Lettering},
    sheet::{ACCENT, Colour, FAINT, GREY, INK, LABEL, NARROW, Sheet, Stroke},
};

/// Checks in groups, each by its source.
#[derive(Clone, Debug, PartialEq)]
pub struct EvidencePlot {
    /// What is checked.
    pub title: String,
    /// What is told under it.
    pub told: String,
    /// The groups.
    pub groups: Vec<EvidenceGroup>,
}

/// Checks of one kind.
#[derive(Clone, Debug, PartialEq)]
pub struct EvidenceGroup {
    /// Where the expected values come from.
    pub name: String,
    /// The checks.
    pub rows: Vec<EvidenceRow>,
}

/// One check; all values over the expected one, so that rows of any unit stand on one axis.
#[derive(Clone, Debug, PartialEq)]
pub struct EvidenceRow {
    /// What is checked.
    pub name: String,
    /// Expected and found with their unit, for the margin.
    pub values: String,
    /// Least and most that is accepted.
    pub accepted: [f64; 2],
    /// Low and high of the program; none where they were not drawn.
    pub band: Option<[f64; 2]>,
    /// What the program gives.
    pub found: f64,
    /// Whether it lies inside.
    pub inside: bool,
}

const MARGIN: f64 = 20.0;
const ROW: f64 = 18.0;
const HEADING: f64 = 26.0;
const NAMES: f64 = 250.0;
const PANEL: f64 = 330.0;
const VALUES: f64 = 150.0;
const ACCEPTED: Colour = Colour(0xDD, 0xE6, 0xEC);
const FOUND: Colour = Colour(0x1F, 0x63, 0x91);

/// Draws every row on one logarithmic axis.
pub(super) fn draw(plot: &EvidencePlot) -> Result<Sheet, FigureError> {
    let axis = over(plot)?;
    let left = MARGIN + NAMES;
    let right = left + PANEL;
    let mut sheet = Sheet::new(right + 14.0 + VALUES + MARGIN);
    let top = sheet.header(&plot.title, &plot.told) + 4.0;
    let rows = |group: &EvidenceGroup| HEADING + ROW * group.rows.len() as f64;
    let frame = Frame {
        left,
        right,
        top,
        bottom: top + plot.groups.iter().map(rows).sum::<f64>() + 6.0,
    };
    let x = |value: f64| left + axis.place(value).clamp(0.0, 1.0) * PANEL;
    for (value, _) in axis.ticks(8) {
        let line = [[x(value), frame.top], [x(value), frame.bottom]];
        sheet.line(&line, Stroke::solid(NARROW, FAINT));
    }
    let small = Lettering::plain(LABEL - 1.0, INK, Anchor::End);
    let beside = Lettering::plain(LABEL - 1.5, GREY, Anchor::Start);
    let bold = Lettering {
        weight: Weight::Bold,
        ..Lettering::plain(LABEL - 0.5, INK, Anchor::Start)
    };
    let mut y = frame.top;
    for group in &plot.groups {
        let room = sheet.size[0] - 2.0 * MARGIN;
        sheet.text([MARGIN, y + 18.0], bold.shortened(&group.name, room), bold);
        y += HEADING;
        for row in &group.rows {
            let middle = y + 0.5 * ROW;
            let band = Frame {
                left: x(row.accepted[0]),
                right: x(row.accepted[1]),
                top: middle - 6.0,
                bottom: middle + 6.0,
            };
            sheet.area(corners(band), ACCEPTED);
            sheet.closed_within(band, &corners(band), Stroke::solid(NARROW, GREY));
            let colour = if row.inside { FOUND } else { ACCENT };
            if let Some([low, high]) = row.band {
                let line = [[x(low), middle], [x(high), middle]];
                sheet.line(&line, Stroke::solid(2.0, colour));
            }
            sheet.disc([x(row.found), middle], 3.6, colour);
            let place = [left - 10.0, middle + 4.0];
            sheet.text(place, small.shortened(&row.name, NAMES - 14.0), small);
            let told = if row.inside {
                row.values.clone()
            } else {
                format!("{}: miss", row.values)
            };
            let lettering = Lettering {
                colour: if row.inside { GREY } else { ACCENT },
                ..beside
            };
            let place = [right + 14.0, middle + 4.0];
            sheet.text(place, lettering.shortened(&told, VALUES), lettering);
            y += ROW;
        }
    }
    let one = [[x(1.0), frame.top], [x(1.0), frame.bottom]];
    sheet.line(&one, Stroke::solid(1.0, INK));
    axis::bottom(&mut sheet, frame, (&axis, Some("found over expected, 1")));
    let room = Frame {
        left: MARGIN,
        top: frame.bottom + BELOW + 6.0,
        right: sheet.size[0] - MARGIN,
        bottom: f64::INFINITY,
    };
    let items = [
        (
            Sample::Edged(ACCEPTED, Stroke::solid(NARROW, GREY)),
            "accepted".to_owned(),
        ),
        (Sample::Dot(FOUND), "found, nominal".to_owned()),
        (
            Sample::Line(Stroke::solid(2.0, FOUND)),
            "found, low to high".to_owned(),
        ),
        (Sample::Dot(ACCENT), "miss".to_owned()),
        (Sample::Line(Stroke::solid(1.0, INK)), "expected".to_owned()),
    ];
    sheet.size[1] = legend(&mut sheet, room, &items) + 12.0;
    Ok(sheet)
}

/// The axis over all rows; what lies far outside is drawn at its end.
fn over(plot: &EvidencePlot) -> Result<Axis, FigureError> {
    let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
    for row in plot.groups.iter().flat_map(|group| &group.rows) {
        let band = row.band.unwrap_or([row.found; 2]);
        for value in [
            row.found,
            band[0],
            band[1],
            row.accepted[0],
            row.accepted[1],
        ] {
            let value = drawable(value, "the evidence")?;
            if value > 0.0 {
                low = low.min(value);
                high = high.max(value);
            }
        }
    }
    if low > high {
        return Err(FigureError::Empty("the evidence"));
    }
    Ok(Axis::logarithmic(low.max(0.02) / 1.1, high.min(50.0) * 1.1))
}
