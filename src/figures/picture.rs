//! A field as one indexed image.

use crate::figures::{FigureError, clip::Frame, ramp, sheet::Colour};

/// Index of a pixel that shows nothing.
pub(super) const NOTHING: u8 = 0;

/// An image whose pixels are steps of the ramp.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Picture {
    /// Where it lies on the sheet, points.
    pub(super) place: Frame,
    /// Columns and rows.
    pub(super) size: [usize; 2],
    /// Row by row from above: [`NOTHING`] or one more than the step of the ramp.
    pub(super) indices: Vec<u8>,
}

impl Picture {
    /// A vertical bar of the whole ramp, dark at the top.
    pub(super) fn bar(place: Frame) -> Self {
        Self {
            place,
            size: [1, ramp::STEPS],
            indices: (0..ramp::STEPS)
                .rev()
                .map(|step| (step + 1) as u8)
                .collect(),
        }
    }

    /// The image as PNG with a palette; nothing is transparent.
    pub(super) fn png(&self) -> Result<Vec<u8>, FigureError> {
        let mut palette = vec![0xFF; 3];
        for Colour(r, g, b) in ramp::colours() {
            palette.extend([r, g, b]);
        }
        let mut bytes = Vec::new();
        let mut encoder = png::Encoder::new(&mut bytes, self.size[0] as u32, self.size[1] as u32);
        encoder.set_color(png::ColorType::Indexed);
        encoder.set_depth(png::BitDepth::Eight);
        encoder.set_palette(palette);
        encoder.set_trns(vec![0]);
        encoder.set_compression(png::Compression::High);
        encoder
            .write_header()
            .and_then(|mut writer| writer.write_image_data(&self.indices))
            .map_err(|error| FigureError::Output(error.to_string()))?;
        Ok(bytes)
    }

    /// Paints the image into a buffer of RGB pixels, `scale` pixels to the point.
    pub(super) fn paint(&self, buffer: &mut [u8], width: usize, scale: f64) {
        let colours = ramp::colours();
        let place = self.place;
        let [columns, rows] = self.size;
        let from = |edge: f64| (edge * scale).round().max(0.0) as usize;
        for y in from(place.top)..from(place.bottom) {
            let row = ((y as f64 + 0.5) / scale - place.top) / place.height() * rows as f64;
            for x in from(place.left)..from(place.right).min(width) {
                let column =
                    ((x as f64 + 0.5) / scale - place.left) / place.width() * columns as f64;
                let at =
                    (row as usize).min(rows - 1) * columns + (column as usize).min(columns - 1);
                let index = self.indices[at];
                if index == NOTHING {
                    continue;
                }
                let Colour(r, g, b) = colours[usize::from(index) - 1];
                if let Some(pixel) = buffer.get_mut(3 * (y * width + x)..3 * (y * width + x) + 3) {
                    pixel.copy_from_slice(&[r, g, b]);
                }
            }
        }
    }
}
