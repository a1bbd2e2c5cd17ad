//! Temperatures through the thickness, beside the cut and on its heights.

use crate::figures::{
    FigureError,
    axis::{self, Axis, significant},
    drawable,
    legend::Sample,
    section::{ROUNDING, SectionPlot, View, place_stroke},
    sheet::{FAINT, GREY, INK, NARROW, Sheet, Stroke},
    warmth::unit,
};

const JUMP: Stroke = Stroke::dashed(NARROW, INK, &[1.5, 2.0]);

/// Draws a line for every place; returns their names with the jump between the faces.
pub(super) fn draw(
    sheet: &mut Sheet,
    view: &View,
    plot: &SectionPlot,
) -> Result<Vec<(Sample, String)>, FigureError> {
    let (section, panel) = (&plot.section, view.frame);
    let points = || {
        let plates = section.through.iter().flat_map(|through| &through.plates);
        plates.flatten()
    };
    let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
    for [_, rise] in points() {
        let shown = drawable(rise * view.factor, "the temperatures")?;
        low = low.min(shown);
        high = high.max(shown);
    }
    if low > high {
        return Ok(Vec::new());
    }
    if low.abs() < ROUNDING * (high - low) {
        low = 0.0;
    }
    let axis = Axis::around(low, high);
    for plate in &section.plates {
        for height in [plate.section.heights.first(), plate.section.heights.last()] {
            let y = view.y(height.copied().unwrap_or(0.0));
            let line = [[panel.left, y], [panel.right, y]];
            sheet.line_within(panel, &line, Stroke::solid(0.8, FAINT));
        }
    }
    sheet.line(
        &[[panel.left, panel.top], [panel.left, panel.bottom]],
        Stroke::solid(NARROW, GREY),
    );
    let title = format!("temperature, {}", unit(plot.heat));
    axis::bottom(sheet, panel, (&axis, Some(&title)));
    let place = |[height, rise]: [f64; 2]| {
        let x = panel.left + axis.place(rise * view.factor) * panel.width();
        [x, view.y(height)]
    };
    let mut items = Vec::new();
    for (index, through) in section.through.iter().enumerate() {
        let stroke = place_stroke(index);
        let mut jumps = Vec::new();
        for plate in &through.plates {
            let line: Vec<[f64; 2]> = plate.iter().map(|point| place(*point)).collect();
            sheet.line_within(panel, &line, stroke);
        }
        for pair in through.plates.windows(2) {
            if let (Some(warm), Some(cold)) = (pair[0].first(), pair[1].last()) {
                sheet.line_within(panel, &[place(*warm), place(*cold)], JUMP);
                jumps.push(significant((warm[1] - cold[1]) * view.factor, 3));
            }
        }
        let jump = format!(
            "{}: {} {} across the faces",
            through.name,
            jumps.join(" and "),
            unit(plot.heat)
        );
        items.push((Sample::Line(stroke), jump));
    }
    Ok(items)
}
