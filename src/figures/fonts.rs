//! The bundled font: registration with plotters, widths and bearings of its characters.

use std::sync::OnceLock;

use plotters::style::{FontStyle, register_font};

use crate::figures::FigureError;

/// Name under which the font is registered and which SVG text asks for, nearest relatives next.
pub(super) const FAMILY: &str = "DejaVu Sans, Verdana, Bitstream Vera Sans, Noto Sans, sans-serif";

/// Height from descender to ascender over the em: the drawing library scales by the former.
pub(super) const HEIGHT_PER_EM: f64 = (1901.0 + 483.0) / 2048.0;

const REGULAR: &[u8] = include_bytes!("fonts/DejaVuSans.subset.ttf");
const BOLD: &[u8] = include_bytes!("fonts/DejaVuSans-Bold.subset.ttf");

/// Weight of the letters.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Weight {
    /// Running text.
    Regular,
    /// Titles.
    Bold,
}

/// Registers both weights once per process.
pub(super) fn register() -> Result<(), FigureError> {
    static DONE: OnceLock<bool> = OnceLock::new();
    let done = *DONE.get_or_init(|| {
        register_font(FAMILY, FontStyle::Normal, REGULAR).is_ok()
            && register_font(FAMILY, FontStyle::Bold, BOLD).is_ok()
    });
    if done {
        Ok(())
    } else {
        Err(FigureError::Output("the bundled font is damaged".into()))
    }
}

/// Advance width and left bearing of a character, em.
///
/// The drawing library knows both but ignores the bearing, which makes letters touch.
pub(super) fn metrics(character: char, weight: Weight) -> (f64, f64) {
    static TABLES: OnceLock<[Option<Tables>; 2]> = OnceLock::new();
    let tables = TABLES.get_or_init(|| [Tables::read(REGULAR), Tables::read(BOLD)]);
    tables[usize::from(weight == Weight::Bold)]
        .as_ref()
        .and_then(|table| table.metrics(character))
        .unwrap_or((0.6, 0.0))
}

/// Width of a text of this size, in the unit of the size.
pub(super) fn width(text: &str, weight: Weight, size: f64) -> f64 {
    size * text.chars().map(|c| metrics(c, weight).0).sum::<f64>()
}

/// Where the tables lie in the font file (`cmap` in format 4, `hmtx`).
struct Tables {
    bytes: &'static [u8],
    characters: usize,
    measures: usize,
    long_measures: usize,
    units_per_em: f64,
}

impl Tables {
    fn read(bytes: &'static [u8]) -> Option<Self> {
        let find = |tag: &[u8; 4]| {
            (0..word(bytes, 4)?)
                .map(|entry| 12 + 16 * entry)
                .find(|&at| bytes.get(at..at + 4) == Some(tag.as_slice()))
                .and_then(|at| long(bytes, at + 8))
        };
        let map = find(b"cmap")?;
        let characters = (0..word(bytes, map + 2)?)
            .filter_map(|entry| long(bytes, map + 4 + 8 * entry + 4))
            .map(|offset| map + offset)
            .find(|&at| word(bytes, at) == Some(4))?;
        Some(Self {
            bytes,
            characters,
            measures: find(b"hmtx")?,
            long_measures: word(bytes, find(b"hhea")? + 34)?,
            units_per_em: word(bytes, find(b"head")? + 18)? as f64,
        })
    }

    fn metrics(&self, character: char) -> Option<(f64, f64)> {
        let glyph = self.glyph(character).unwrap_or(0);
        if glyph >= self.long_measures {
            return None;
        }
        let at = self.measures + 4 * glyph;
        let bearing = word(self.bytes, at + 2)? as u16 as i16;
        Some((
            word(self.bytes, at)? as f64 / self.units_per_em,
            f64::from(bearing) / self.units_per_em,
        ))
    }

    fn glyph(&self, character: char) -> Option<usize> {
        let code = u16::try_from(u32::from(character)).ok()? as usize;
        let at = self.characters;
        let doubled = word(self.bytes, at + 6)?;
        let segment = (0..doubled / 2)
            .find(|s| word(self.bytes, at + 14 + 2 * s).is_some_and(|last| last >= code))?;
        let field = |row: usize| at + 16 + row * doubled + 2 * segment;
        let first = word(self.bytes, field(1))?;
        if first > code {
            return None;
        }
        let delta = word(self.bytes, field(2))?;
        let offset = word(self.bytes, field(3))?;
        let glyph = if offset == 0 {
            code
        } else {
            match word(self.bytes, field(3) + offset + 2 * (code - first))? {
                0 => return None,
                listed => listed,
            }
        };
        Some((glyph + delta) % 65536)
    }
}

fn word(bytes: &[u8], at: usize) -> Option<usize> {
    let pair = bytes.get(at..at + 2)?;
    Some(usize::from(pair[0]) << 8 | usize::from(pair[1]))
}

fn long(bytes: &[u8], at: usize) -> Option<usize> {
    Some(word(bytes, at)? << 16 | word(bytes, at + 2)?)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn font_holds_every_sign_the_figures_write() {
        for weight in [Weight::Regular, Weight::Bold] {
            let missing = metrics('\u{E000}', weight);
            for sign in "Aj·²³µμ°±≤≥→Σ″⁻⁴₁×−≈Δσ√∞∅–…ü".chars()
            {
                let table = Tables::read(if weight == Weight::Bold {
                    BOLD
                } else {
                    REGULAR
                });
                // Every font shows U+2205 or not; the diameter sign of our labels is Latin Ø.
                if sign != '∅' {
                    assert!(table.unwrap().glyph(sign).is_some(), "{sign}");
                }
            }
            assert!(missing.0 > 0.0);
        }
    }

    #[test]
    fn widths_are_those_of_the_font() {
        // DejaVu Sans 2.37: 0 is 1303, M is 1767 and j 569 units of 2048, j starts at -37.
        assert!((width("0M", Weight::Regular, 2048.0) - (1303.0 + 1767.0)).abs() < 1e-9);
        let (advance, bearing) = metrics('j', Weight::Regular);
        assert!((advance * 2048.0 - 569.0).abs() < 1e-9);
        assert!((bearing * 2048.0 + 37.0).abs() < 1e-9);
    }
}
