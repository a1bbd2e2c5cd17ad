//! Text as the figures set it: cleaned, wrapped and shortened to the room there is.

use crate::figures::{
    fonts::{self, Weight},
    sheet::Colour,
};

/// Which point of the text the place names; the height is always the baseline.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Anchor {
    /// Start of the text.
    Start,
    /// Its middle.
    Middle,
    /// Its end.
    End,
}

/// Direction of the text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Turn {
    /// From left to right.
    None,
    /// From below upwards, as on a vertical axis.
    Up,
}

/// How a text is set.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Lettering {
    /// Size of the em, points.
    pub(super) size: f64,
    /// Weight.
    pub(super) weight: Weight,
    /// Colour.
    pub(super) colour: Colour,
    /// What the place names.
    pub(super) anchor: Anchor,
    /// Direction.
    pub(super) turn: Turn,
}

impl Lettering {
    /// Regular weight, from left to right.
    pub(super) const fn plain(size: f64, colour: Colour, anchor: Anchor) -> Self {
        Self {
            size,
            weight: Weight::Regular,
            colour,
            anchor,
            turn: Turn::None,
        }
    }

    /// Width of a text, points.
    pub(super) fn width(&self, text: &str) -> f64 {
        fonts::width(text, self.weight, self.size)
    }

    /// The text, cut with an ellipsis where it is wider than the room, points.
    pub(super) fn shortened(&self, text: &str, room: f64) -> String {
        let text = cleaned(text);
        if self.width(&text) <= room {
            return text;
        }
        let mut left = room - self.width("…");
        let mut short = String::new();
        for character in text.chars() {
            left -= self.size * fonts::metrics(character, self.weight).0;
            if left < 0.0 {
                break;
            }
            short.push(character);
        }
        format!("{}…", short.trim_end())
    }

    /// The text in at most `most` lines of at most `room` points; what is left over is cut.
    pub(super) fn wrapped(&self, text: &str, room: f64, most: usize) -> Vec<String> {
        let text = cleaned(text);
        let mut lines: Vec<String> = Vec::new();
        for word in text.split(' ') {
            let full = lines.len() == most;
            match lines.last_mut() {
                // The last line takes every word that is left and is cut at the end.
                Some(line) if full || self.width(&format!("{line} {word}")) <= room => {
                    line.push(' ');
                    line.push_str(word);
                }
                _ => lines.push(word.to_owned()),
            }
        }
        lines
            .iter()
            .map(|line| self.shortened(line, room))
            .collect()
    }
}

/// The text without what no drawing can show: control and direction signs, runs of blanks.
pub(super) fn cleaned(text: &str) -> String {
    let shown: String = text
        .chars()
        .map(|c| match c {
            '\u{200B}'..='\u{200F}'
            | '\u{2028}'..='\u{202E}'
            | '\u{2060}'..='\u{206F}'
            | '\u{FEFF}'
            | '\u{FFF0}'..='\u{FFFF}' => ' ',
            c if c.is_control() || u32::from(c) & 0xFFFE == 0xFFFE => ' ',
            c => c,
        })
        .collect();
    shown
        // Blanks that bind a number to its unit stay.
        .split(|c: char| c.is_whitespace() && c != '\u{a0}' && c != '\u{2009}')
        .filter(|word| !word.is_empty())
        .collect::<Vec<_>>()
        .join(" ")
}

#[cfg(test)]
mod tests {
    use super::*;

    const TEXT: Lettering = Lettering::plain(10.0, Colour(0, 0, 0), Anchor::Start);

    #[test]
    fn wrapped_lines_keep_within_their_room() {
        let text = "a very long title of a joint with many words and one Unbreakableunbreakableunbreakable";
        for room in [40.0, 90.0, 300.0] {
            let lines = TEXT.wrapped(text, room, 2);
            assert!(lines.len() <= 2);
            for line in lines {
                // The ellipsis itself is kept however small the room.
                assert!(TEXT.width(&line) <= room, "{line}");
            }
        }
    }

    #[test]
    fn control_signs_become_blanks() {
        assert_eq!(cleaned("a\u{0}b\n\tc\u{202E}d "), "a b c d");
    }
}
