//! Evidence: what was expected and what the program gives, row by row, misses included.

use crate::figures::{
    FigureError,
    axis::{self, Axis, BELOW},
    clip::Frame,
    drawable,
    fonts::Weight,
    legend::{Sample, corners, legend},
    lettering::{Anchor, Lettering},
    setting::Width,
    sheet::{ACCENT, Colour, FAINT, GREY, INK, LABEL, NARROW, Sheet, Stroke},
};

/// Checks on one or more axes, below each other.
#[derive(Clone, Debug, PartialEq)]
pub struct EvidencePlot {
    /// What is checked.
    pub title: String,
    /// What is told under it.
    pub told: String,
    /// The panels.
    pub panels: Vec<EvidencePanel>,
}

/// Checks on one axis.
#[derive(Clone, Debug, PartialEq)]
pub struct EvidencePanel {
    /// What the axis is.
    pub axis: EvidenceAxis,
    /// Where the expected values come from.
    pub name: String,
    /// The checks.
    pub rows: Vec<EvidenceRow>,
}

/// What lies along the axis of a panel.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum EvidenceAxis {
    /// Found over expected, so that rows of any unit stand on one axis.
    Ratio,
    /// Deviation over the deviation that is accepted.
    Tolerance,
}

/// A check, or all checks against one source.
#[derive(Clone, Debug, PartialEq)]
pub struct EvidenceRow {
    /// What is checked.
    pub name: String,
    /// Expected and found, for the margin.
    pub values: String,
    /// Least and most that is accepted.
    pub accepted: [f64; 2],
    /// Low and high of the program; none where they were not drawn.
    pub band: Option<[f64; 2]>,
    /// What the program gives, a mark for each check.
    pub found: Vec<f64>,
}

impl EvidenceRow {
    /// Whether every check lies inside.
    fn is_inside(&self) -> bool {
        self.found.iter().all(|found| self.holds(*found))
    }

    fn holds(&self, found: f64) -> bool {
        self.accepted[0] <= found && found <= self.accepted[1]
    }
}

const MARGIN: f64 = 20.0;
const ROW: f64 = 18.0;
const HEADING: f64 = 26.0;
const NAMES: f64 = 250.0;
const PANEL: f64 = 330.0;
const VALUES: f64 = 150.0;
/// Factor beyond which a mark stands at the end of the axis.
const FARTHEST: f64 = 20.0;
const EXPECTED: Stroke = Stroke::solid(1.0, INK);
const ACCEPTED: Colour = Colour(0xDD, 0xE6, 0xEC);
const FOUND: Colour = Colour(0x1F, 0x63, 0x91);

/// Draws panel by panel.
pub(super) fn draw(plot: &EvidencePlot) -> Result<Sheet, FigureError> {
    let left = MARGIN + NAMES;
    let right = left + PANEL;
    let mut sheet = Sheet::new(right + 14.0 + VALUES + MARGIN);
    let mut top = sheet.header(&plot.title, &plot.told, Width::Full) + 4.0;
    for panel in &plot.panels {
        let frame = Frame {
            left,
            right,
            top: top + HEADING,
            bottom: top + HEADING + ROW * panel.rows.len() as f64 + 4.0,
        };
        draw_panel(&mut sheet, frame, panel)?;
        top = frame.bottom + BELOW + 8.0;
    }
    let room = Frame {
        left: MARGIN,
        top,
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
        (Sample::Line(EXPECTED), "expected".to_owned()),
    ];
    sheet.size[1] = legend(&mut sheet, room, &items) + 12.0;
    Ok(sheet)
}

/// The rows of a panel with their names and values, the axis below.
fn draw_panel(sheet: &mut Sheet, frame: Frame, panel: &EvidencePanel) -> Result<(), FigureError> {
    let axis = over(panel)?;
    let x = |value: f64| {
        // Beyond the axis a mark stands at its end; a logarithm of nothing is its lower end.
        let place = axis.place(value);
        let place = if place.is_nan() { 0.0 } else { place };
        frame.left + place.clamp(0.0, 1.0) * frame.width()
    };
    let bold = Lettering {
        weight: Weight::Bold,
        ..Lettering::plain(LABEL - 0.5, INK, Anchor::Start)
    };
    let room = sheet.size[0] - 2.0 * MARGIN;
    let place = [MARGIN, frame.top - 9.0];
    sheet.text(place, bold.shortened(&panel.name, room), bold);
    for (value, _) in axis.ticks(8) {
        let line = [[x(value), frame.top], [x(value), frame.bottom]];
        sheet.line(&line, Stroke::solid(NARROW, FAINT));
    }
    for (index, row) in panel.rows.iter().enumerate() {
        let middle = frame.top + ROW * (index as f64 + 0.5) + 2.0;
        let band = Frame {
            left: x(row.accepted[0]),
            right: x(row.accepted[1]),
            top: middle - 6.0,
            bottom: middle + 6.0,
        };
        sheet.area(corners(band), ACCEPTED);
        sheet.closed_within(band, &corners(band), Stroke::solid(NARROW, GREY));
        let colour = |inside: bool| if inside { FOUND } else { ACCENT };
        if let Some([low, high]) = row.band {
            let line = [[x(low), middle], [x(high), middle]];
            sheet.line(&line, Stroke::solid(2.0, colour(row.is_inside())));
        }
        let many = row.found.len() > 1;
        for found in &row.found {
            let radius = if many { 2.0 } else { 3.6 };
            sheet.disc([x(*found), middle], radius, colour(row.holds(*found)));
        }
        let name = Lettering::plain(LABEL - 1.0, INK, Anchor::End);
        let place = [frame.left - 10.0, middle + 4.0];
        sheet.text(place, name.shortened(&row.name, NAMES - 10.0), name);
        let (ink, told) = if row.is_inside() {
            (GREY, row.values.clone())
        } else {
            (ACCENT, format!("{}, miss", row.values))
        };
        let values = Lettering::plain(LABEL - 1.5, ink, Anchor::Start);
        let place = [frame.right + 14.0, middle + 4.0];
        sheet.text(place, values.shortened(&told, VALUES), values);
    }
    let (expected, title) = match panel.axis {
        EvidenceAxis::Ratio => (1.0, "found over expected"),
        EvidenceAxis::Tolerance => (0.0, "deviation over the deviation that is accepted"),
    };
    let line = [[x(expected), frame.top], [x(expected), frame.bottom]];
    sheet.line(&line, EXPECTED);
    axis::bottom(sheet, frame, (&axis, Some(title)));
    Ok(())
}

/// The axis over all rows; what lies far outside is drawn at its end.
fn over(panel: &EvidencePanel) -> Result<Axis, FigureError> {
    let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
    for row in &panel.rows {
        let ends = row.band.iter().flatten().chain(&row.accepted);
        for value in ends.chain(&row.found) {
            let value = drawable(*value, "the evidence")?;
            if value > 0.0 || panel.axis == EvidenceAxis::Tolerance {
                low = low.min(value);
                high = high.max(value);
            }
        }
    }
    if low > high {
        return Err(FigureError::Empty("the evidence"));
    }
    Ok(match panel.axis {
        EvidenceAxis::Ratio => {
            Axis::logarithmic(low.max(FARTHEST.recip()) / 1.1, high.min(FARTHEST) * 1.1)
        }
        EvidenceAxis::Tolerance => {
            Axis::over(low.clamp(-3.0, -1.0) * 1.1, high.clamp(1.0, 3.0) * 1.1)
        }
    })
}
