//! The sheet as a file: marks replayed on the vector and the pixel backend of plotters.

use std::fmt::Write as _;

use base64::{Engine as _, engine::general_purpose::STANDARD};
use plotters::{
    backend::{BitMapBackend, DrawingBackend, SVGBackend},
    style::{
        Color, FontDesc, FontFamily, FontStyle, FontTransform, RGBColor, ShapeStyle, TextStyle,
        text_anchor::{HPos, Pos, VPos},
    },
};

use crate::figures::{
    FigureError, LONGEST,
    fonts::{self, FAMILY, HEIGHT_PER_EM, Weight},
    lettering::{Anchor, Lettering, Turn},
    sheet::{Colour, Mark, Sheet},
};

/// Steps of the backend's whole-number grid to the point, so that no curve shows stairs.
const FINE: usize = 4;

/// Pixels of the final image to the point; the fine grid is averaged down to it.
const PIXELS: usize = 2;

/// The vector backend multiplies text sizes by this and lets text of anchor `Top` hang by that.
const VECTOR_SIZE: f64 = 1.24;
const VECTOR_HANG: f64 = 0.76;

/// The sheet as one `<svg>` element.
pub(super) fn svg(sheet: &Sheet) -> Result<String, FigureError> {
    fonts::register()?;
    let [width, height] = fine_size(sheet)?;
    let mut body = String::new();
    let mut backend = SVGBackend::with_string(&mut body, (width as u32, height as u32));
    for mark in &sheet.marks {
        replay(&mut backend, mark, vector_text)?;
    }
    backend.present().map_err(failed)?;
    drop(backend);
    let marks = body.split_once('\n').map_or("", |(_, marks)| marks);
    let mut document = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{}\" height=\"{}\" viewBox=\"0 0 {width} {height}\" role=\"img\" font-family=\"{FAMILY}\">\n<title>{}</title>\n<rect width=\"{width}\" height=\"{height}\" fill=\"#FFFFFF\"/>\n",
        width / FINE,
        height / FINE,
        escaped(&sheet.title),
    );
    for picture in &sheet.pictures {
        let place = picture.place;
        let [left, top, across, down] =
            [place.left, place.top, place.width(), place.height()].map(|v| v * FINE as f64);
        // Writing to a string cannot fail.
        let _ = writeln!(
            document,
            "<image x=\"{left:.1}\" y=\"{top:.1}\" width=\"{across:.1}\" height=\"{down:.1}\" preserveAspectRatio=\"none\" style=\"image-rendering:pixelated\" href=\"data:image/png;base64,{}\"/>",
            STANDARD.encode(picture.png()?),
        );
    }
    // Quotes in texts are escaped, so these patterns can only be attributes.
    let marks = marks
        .replace(" opacity=\"1\"", "")
        .replace(" \"/>", "\"/>")
        .replace(&format!(" font-family=\"{FAMILY}\""), "");
    document.push_str(&joined(&marks));
    Ok(document)
}

/// Marks with lines of one stroke that follow each other as one path: dashes are many and short.
fn joined(marks: &str) -> String {
    let mut document = String::with_capacity(marks.len());
    let mut open: Option<&str> = None;
    for line in marks.split_inclusive('\n') {
        let stroke = line
            .strip_prefix("<polyline ")
            .and_then(|rest| rest.trim_end().strip_suffix("\"/>"))
            .and_then(|rest| rest.split_once(" points=\""));
        let (style, points) = match stroke {
            Some((style, points)) => (Some(style), points),
            None => (None, ""),
        };
        if open != style && open.is_some() {
            document.push_str("\"/>\n");
        }
        match style {
            None => document.push_str(line),
            Some(style) => {
                if open != Some(style) {
                    document.push_str("<path ");
                    document.push_str(style);
                    document.push_str(" d=\"");
                }
                document.push('M');
                document.push_str(points);
            }
        }
        open = style;
    }
    if open.is_some() {
        document.push_str("\"/>\n");
    }
    document
}

/// The sheet as PNG.
pub(super) fn png(sheet: &Sheet) -> Result<Vec<u8>, FigureError> {
    fonts::register()?;
    let [width, height] = fine_size(sheet)?;
    let mut buffer = vec![0xFF; 3 * width * height];
    for picture in &sheet.pictures {
        picture.paint(&mut buffer, width, FINE as f64);
    }
    let mut backend = BitMapBackend::with_buffer(&mut buffer, (width as u32, height as u32));
    for mark in &sheet.marks {
        replay(&mut backend, mark, pixel_text)?;
    }
    backend.present().map_err(failed)?;
    drop(backend);

    let step = FINE / PIXELS;
    let (columns, rows) = (width / step, height / step);
    let mut pixels = Vec::with_capacity(3 * columns * rows);
    let mut sums = vec![0_u16; 3 * columns];
    for band in buffer.chunks_exact(3 * width * step).take(rows) {
        sums.fill(0);
        for line in band.chunks_exact(3 * width) {
            for (sum, block) in sums.chunks_exact_mut(3).zip(line.chunks_exact(3 * step)) {
                for pixel in block.chunks_exact(3) {
                    sum[0] += u16::from(pixel[0]);
                    sum[1] += u16::from(pixel[1]);
                    sum[2] += u16::from(pixel[2]);
                }
            }
        }
        pixels.extend(sums.iter().map(|sum| (sum / (step * step) as u16) as u8));
    }
    let mut bytes = Vec::new();
    let mut encoder = png::Encoder::new(&mut bytes, columns as u32, rows as u32);
    encoder.set_color(png::ColorType::Rgb);
    encoder.set_depth(png::BitDepth::Eight);
    // The nominal 96 points to the inch, in pixels per metre.
    let per_metre = (96.0 * PIXELS as f64 / 0.0254).round() as u32;
    encoder.set_pixel_dims(Some(png::PixelDimensions {
        xppu: per_metre,
        yppu: per_metre,
        unit: png::Unit::Meter,
    }));
    encoder
        .write_header()
        .and_then(|mut writer| writer.write_image_data(&pixels))
        .map_err(failed)?;
    Ok(bytes)
}

fn replay<B: DrawingBackend>(
    backend: &mut B,
    mark: &Mark,
    text: impl Fn(&mut B, [f64; 2], &str, Lettering) -> Result<(), FigureError>,
) -> Result<(), FigureError> {
    match mark {
        Mark::Line(points, width, colour) => {
            let mut path: Vec<(i32, i32)> = points.iter().map(|&p| grid(p)).collect();
            path.dedup();
            if path.len() < 2 {
                return Ok(());
            }
            let stroke = (width * FINE as f64).round().max(1.0) as u32;
            let style = ShapeStyle::from(paint(*colour)).stroke_width(stroke);
            backend.draw_path(path, &style).map_err(failed)
        }
        Mark::Area(points, colour) => {
            let path: Vec<(i32, i32)> = points.iter().map(|&p| grid(p)).collect();
            let style = ShapeStyle::from(paint(*colour)).filled();
            backend.fill_polygon(path, &style).map_err(failed)
        }
        Mark::Disc(centre, radius, colour) => {
            let radius = (radius * FINE as f64).round().clamp(1.0, 2e4) as u32;
            let style = ShapeStyle::from(paint(*colour)).filled();
            backend
                .draw_circle(grid(*centre), radius, &style, true)
                .map_err(failed)
        }
        Mark::Ring(centre, radius, width, colour) => {
            let radius = (radius * FINE as f64).round().clamp(1.0, 2e4) as u32;
            let stroke = (width * FINE as f64).round().max(1.0) as u32;
            let style = ShapeStyle::from(paint(*colour)).stroke_width(stroke);
            backend
                .draw_circle(grid(*centre), radius, &style, false)
                .map_err(failed)
        }
        Mark::Text(at, content, lettering) => text(backend, *at, content, *lettering),
    }
}

/// Text as text: the reader's machine sets it.
fn vector_text<B: DrawingBackend>(
    backend: &mut B,
    at: [f64; 2],
    content: &str,
    lettering: Lettering,
) -> Result<(), FigureError> {
    let hang = VECTOR_HANG * lettering.size;
    let place = match lettering.turn {
        Turn::None => [at[0], at[1] - hang],
        Turn::Up => [at[0] - hang, at[1]],
    };
    let horizontal = match lettering.anchor {
        Anchor::Start => HPos::Left,
        Anchor::Middle => HPos::Center,
        Anchor::End => HPos::Right,
    };
    let turn = match lettering.turn {
        Turn::None => FontTransform::None,
        Turn::Up => FontTransform::Rotate270,
    };
    let font = font(lettering.size * FINE as f64 * VECTOR_SIZE, lettering.weight).transform(turn);
    let colour = paint(lettering.colour);
    let style = TextStyle::from(font)
        .color(&colour)
        .pos(Pos::new(horizontal, VPos::Top));
    backend
        .draw_text(content, &style, grid(place))
        .map_err(failed)
}

/// Text as pixels of the bundled font, each letter at its own bearing.
fn pixel_text<B: DrawingBackend>(
    backend: &mut B,
    at: [f64; 2],
    content: &str,
    lettering: Lettering,
) -> Result<(), FigureError> {
    let em = lettering.size * FINE as f64;
    let height = em * HEIGHT_PER_EM;
    let font = font(height, lettering.weight);
    let before = match lettering.anchor {
        Anchor::Start => 0.0,
        Anchor::Middle => 0.5,
        Anchor::End => 1.0,
    };
    let mut along = -before * lettering.width(content) * FINE as f64;
    let (x, y) = grid(at);
    let colour = paint(lettering.colour).to_backend_color();
    // The library puts the baseline half the height below the place it is given.
    let raise = -(height / 2.0).round() as i32;
    let (wide, tall) = backend.get_size();
    for character in content.chars() {
        let (advance, bearing) = fonts::metrics(character, lettering.weight);
        let start = ((along + bearing * em).round() as i32, raise);
        font.draw(&character.to_string(), start, |u, v, cover| {
            let (u, v) = match lettering.turn {
                Turn::None => (x + u, y + v),
                Turn::Up => (x + v, y - u),
            };
            if u < 0 || v < 0 || u >= wide as i32 || v >= tall as i32 {
                return Ok(());
            }
            backend.draw_pixel((u, v), colour.mix(f64::from(cover)))
        })
        .map_err(failed)?
        .map_err(failed)?;
        along += advance * em;
    }
    Ok(())
}

fn font(size: f64, weight: Weight) -> FontDesc<'static> {
    let style = match weight {
        Weight::Regular => FontStyle::Normal,
        Weight::Bold => FontStyle::Bold,
    };
    FontDesc::new(FontFamily::Name(FAMILY), size, style)
}

/// Size on the backend's grid; nothing that is drawn may lie outside.
fn fine_size(sheet: &Sheet) -> Result<[usize; 2], FigureError> {
    let size = sheet.size.map(|v| v.ceil().max(1.0) as usize);
    match size.into_iter().max() {
        Some(most) if most > LONGEST => Err(FigureError::TooLong(most)),
        _ => Ok(size.map(|v| v * FINE)),
    }
}

/// A place on the backend's grid; far outside is near enough for what cannot be seen.
fn grid(point: [f64; 2]) -> (i32, i32) {
    let at = |v: f64| (v * FINE as f64).round().clamp(-2e4, 2e4) as i32;
    (at(point[0]), at(point[1]))
}

fn paint(Colour(r, g, b): Colour) -> RGBColor {
    RGBColor(r, g, b)
}

fn failed(error: impl std::fmt::Display) -> FigureError {
    FigureError::Output(error.to_string())
}

fn escaped(text: &str) -> String {
    text.replace('&', "&amp;")
        .replace('<', "&lt;")
        .replace('>', "&gt;")
}
