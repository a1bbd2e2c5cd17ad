//! Labels that fly over a frame, each from a line that marks one value of the horizontal axis.

use crate::figures::{
    clip::Frame,
    lettering::{Anchor, Lettering},
    sheet::{Colour, LABEL, Sheet, Stroke},
};

/// One label and the place of its line.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Flag {
    /// Place along the frame, points.
    pub(super) x: f64,
    /// What it says.
    pub(super) text: String,
    /// Its line across the frame; the label takes its colour.
    pub(super) stroke: Stroke,
}

const ROW: f64 = 15.0;
const APART: f64 = 3.5;

/// Where one label stands.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Stand {
    start: f64,
    end: f64,
    row: usize,
}

/// Labels arranged so that none lies on another or on the line of another.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Flags {
    flags: Vec<Flag>,
    stands: Vec<Stand>,
}

impl Flags {
    /// Arranges the labels between the edges, points.
    pub(super) fn arranged(mut flags: Vec<Flag>, [left, right]: [f64; 2]) -> Self {
        // Every label may stand to either side of its line; more than this is never asked for.
        flags.truncate(8);
        flags.sort_by(|a, b| a.x.total_cmp(&b.x));
        for flag in &mut flags {
            let room = (flag.x - left).max(right - flag.x) - APART;
            flag.text = lettering(flag.stroke.colour).shortened(&flag.text, room);
        }
        let stands = (0..1_usize << flags.len())
            .filter_map(|sides| rows(&flags, sides, [left, right]))
            .min_by_key(|stands| {
                stands
                    .iter()
                    .map(|stand| stand.row * stand.row)
                    .sum::<usize>()
            })
            .unwrap_or_else(|| stacked(&flags, right));
        Self { flags, stands }
    }

    /// Height of the rows, points.
    pub(super) fn height(&self) -> f64 {
        let rows = self.stands.iter().map(|stand| stand.row + 1).max();
        ROW * rows.unwrap_or(0) as f64
    }

    /// Draws the labels over the frame and the lines down to `foot`, points.
    pub(super) fn draw(&self, sheet: &mut Sheet, frame: Frame, foot: f64) {
        for (flag, stand) in self.flags.iter().zip(&self.stands) {
            let baseline = frame.top - 5.0 - ROW * stand.row as f64;
            let thin = Stroke {
                dash: &[],
                ..flag.stroke
            };
            sheet.line(&[[flag.x, baseline - 8.0], [flag.x, frame.top]], thin);
            sheet.line(&[[flag.x, frame.top], [flag.x, foot]], flag.stroke);
            let text = lettering(flag.stroke.colour);
            sheet.text([stand.start, baseline], flag.text.clone(), text);
        }
    }
}

fn lettering(colour: Colour) -> Lettering {
    Lettering::plain(LABEL - 1.0, colour, Anchor::Start)
}

/// Lowest rows for one choice of sides; none where a label leaves the sheet or two would cross.
fn rows(flags: &[Flag], sides: usize, [left, right]: [f64; 2]) -> Option<Vec<Stand>> {
    let mut stands: Vec<Stand> = flags
        .iter()
        .enumerate()
        .map(|(index, flag)| {
            let width = lettering(flag.stroke.colour).width(&flag.text);
            let start = if sides >> index & 1 == 0 {
                flag.x + APART
            } else {
                flag.x - APART - width
            };
            Stand {
                start,
                end: start + width,
                row: 0,
            }
        })
        .collect();
    if stands
        .iter()
        .any(|s| s.start < left || s.end > right + 0.01)
    {
        return None;
    }
    // A line that passes through a label must end below it, so that label is lifted; the lift
    // settles within as many rounds as there are labels, or never.
    for _ in 0..=flags.len() {
        let mut settled = true;
        for i in 0..flags.len() {
            for j in 0..flags.len() {
                let crosses = |line: usize, label: usize| {
                    flags[line].x > stands[label].start - APART / 2.0
                        && flags[line].x < stands[label].end + APART / 2.0
                };
                let crossed = crosses(j, i);
                let touching =
                    stands[i].start < stands[j].end + 6.0 && stands[j].start < stands[i].end + 6.0;
                let lift = (crossed && stands[i].row <= stands[j].row)
                    || (touching && i < j && !crosses(i, j) && stands[i].row == stands[j].row);
                if i != j && lift {
                    stands[i].row = stands[j].row + 1;
                    settled = false;
                }
            }
        }
        if settled {
            return Some(stands);
        }
    }
    None
}

/// The last resort: a row each.
fn stacked(flags: &[Flag], right: f64) -> Vec<Stand> {
    (0..flags.len())
        .map(|index| {
            let width = lettering(flags[index].stroke.colour).width(&flags[index].text);
            let start = (flags[index].x + APART).min(right - width);
            Stand {
                start,
                end: start + width,
                row: flags.len() - 1 - index,
            }
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::figures::sheet::INK;

    fn flag(x: f64, text: &str) -> Flag {
        Flag {
            x,
            text: text.into(),
            stroke: Stroke::solid(1.0, INK),
        }
    }

    #[test]
    fn labels_far_apart_share_a_row() {
        let flags = Flags::arranged(vec![flag(10.0, "one"), flag(200.0, "two")], [0.0, 300.0]);
        assert!((flags.height() - ROW).abs() < 1e-9);
    }

    #[test]
    fn close_labels_never_lie_on_each_other_or_on_lines() {
        let flags = Flags::arranged(
            vec![
                flag(280.0, "stated 2.2 N m"),
                flag(285.0, "largest 2.3 N m: yield"),
                flag(290.0, "best 2.4 N m"),
            ],
            [0.0, 300.0],
        );
        for (i, a) in flags.stands.iter().enumerate() {
            for (j, b) in flags.stands.iter().enumerate().filter(|(j, _)| *j != i) {
                let clear = a.end <= b.start || b.end <= a.start;
                assert!(clear || a.row != b.row);
                let crossed = flags.flags[j].x > a.start && flags.flags[j].x < a.end;
                assert!(!crossed || a.row > b.row);
            }
        }
    }
}
