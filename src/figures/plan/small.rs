//! A small map beside others: one colour scale and one length scale for all, no axes of its own.

use crate::figures::{
    FigureError,
    axis::Axis,
    clip::Frame,
    plan::{PlanMap, View, extent, parts, raster},
    sheet::Sheet,
};

/// Width and height of a map on paper at a scale, points.
pub(in crate::figures) fn size(
    map: &PlanMap,
    points_per_metre: f64,
) -> Result<[f64; 2], FigureError> {
    Ok(extent(map.window)?.map(|length| length * points_per_metre))
}

/// Draws the map from a corner of the sheet.
pub(in crate::figures) fn draw(
    sheet: &mut Sheet,
    map: &PlanMap,
    ([left, top], points_per_metre): ([f64; 2], f64),
    colours: &Axis,
) -> Result<(), FigureError> {
    let [width, height] = size(map, points_per_metre)?;
    let view = View {
        frame: Frame {
            left,
            top,
            right: left + width,
            bottom: top + height,
        },
        window: map.window,
        points_per_metre,
        ground: None,
    };
    sheet.pictures.push(raster::picture(map, &view, colours));
    parts::draw_small(sheet, &view, map);
    Ok(())
}
