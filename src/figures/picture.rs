//! A field as one indexed image.

use crate::figures::{
    FigureError,
    clip::Frame,
    ramp::{self, Ramp},
    sheet::{Colour, PAPER},
};

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
    /// The colours of the steps.
    pub(super) ramp: Ramp,
    /// Colour of pixels that show nothing; transparent when none.
    pub(super) ground: Option<Colour>,
}

impl Picture {
    /// A vertical bar of the whole ramp, dark at the top.
    pub(super) fn bar(place: Frame, ramp: Ramp) -> Self {
        let mut bar = Self::level_bar(place, ramp);
        bar.size = [1, ramp::STEPS];
        bar.indices.reverse();
        bar
    }

    /// A level bar of the whole ramp, dark at the right.
    pub(super) fn level_bar(place: Frame, ramp: Ramp) -> Self {
        Self {
            place,
            size: [ramp::STEPS, 1],
            indices: (0..ramp::STEPS).map(|step| (step + 1) as u8).collect(),
            ramp,
            ground: None,
        }
    }

    /// The image as PNG with a palette; without a ground nothing is transparent.
    pub(super) fn png(&self) -> Result<Vec<u8>, FigureError> {
        let Colour(r, g, b) = self.ground.unwrap_or(PAPER);
        let mut palette = vec![r, g, b];
        for Colour(r, g, b) in self.ramp.colours() {
            palette.extend([r, g, b]);
        }
        let mut bytes = Vec::new();
        let mut encoder = png::Encoder::new(&mut bytes, self.size[0] as u32, self.size[1] as u32);
        encoder.set_color(png::ColorType::Indexed);
        encoder.set_depth(png::BitDepth::Eight);
        encoder.set_palette(palette);
        if self.ground.is_none() {
            encoder.set_trns(vec![0]);
        }
        encoder.set_compression(png::Compression::High);
        encoder
            .write_header()
            .and_then(|mut writer| writer.write_image_data(&self.indices))
            .map_err(|error| FigureError::Output(error.to_string()))?;
        Ok(bytes)
    }

    /// Paints the image into a buffer of RGB pixels, `scale` pixels to the point.
    pub(super) fn paint(&self, buffer: &mut [u8], width: usize, scale: f64) {
        let colours = self.ramp.colours();
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
                let shown = match index {
                    NOTHING => self.ground,
                    step => Some(colours[usize::from(step) - 1]),
                };
                let Some(Colour(r, g, b)) = shown else {
                    continue;
                };
                if let Some(pixel) = buffer.get_mut(3 * (y * width + x)..3 * (y * width + x) + 3) {
                    pixel.copy_from_slice(&[r, g, b]);
                }
            }
        }
    }
}
