//! Axes: range, ticks, their labels, and how they are drawn beside a frame.

use crate::figures::{
    clip::Frame,
    lettering::{Anchor, Lettering, Turn},
    sheet::{FAINT, GREY, INK, LABEL, NARROW, Sheet, Stroke},
};

/// Size of tick labels, points.
pub(super) const TICK: f64 = 10.5;
const TICK_LENGTH: f64 = 4.0;
const TEXT: Lettering = Lettering::plain(TICK, INK, Anchor::End);

/// How values are spread along an axis.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Spread {
    /// Evenly.
    Linear,
    /// By their logarithm; both ends are above zero.
    Logarithmic,
}

/// The range of an axis in the shown unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Axis {
    /// Lower end.
    pub(super) low: f64,
    /// Upper end, above the lower one.
    pub(super) high: f64,
    /// Spread between them.
    pub(super) spread: Spread,
}

impl Axis {
    /// A linear axis over exactly this range, widened where it has no width to speak of.
    pub(super) fn over(low: f64, high: f64) -> Self {
        let size = low.abs().max(high.abs());
        let (low, high) = if high - low > 1e-6 * size {
            (low, high)
        } else if size > 0.0 {
            (low - 0.05 * size, high + 0.05 * size)
        } else {
            (0.0, 1.0)
        };
        Self {
            low,
            high,
            spread: Spread::Linear,
        }
    }

    /// A linear axis around the values that ends on ticks; from zero when that costs little.
    pub(super) fn around(low: f64, high: f64) -> Self {
        let low = if low > 0.0 && low < 0.55 * high {
            0.0
        } else {
            low
        };
        let exact = Self::over(low, high);
        let step = exact.step(5);
        Self {
            low: (exact.low / step + 1e-9).floor() * step,
            high: (exact.high / step - 1e-9).ceil() * step,
            spread: Spread::Linear,
        }
    }

    /// A logarithmic axis around values above zero.
    pub(super) fn logarithmic(low: f64, high: f64) -> Self {
        let (low, high) = if high > 1.02 * low {
            (low, high)
        } else {
            (low / 1.5, high * 1.5)
        };
        Self {
            low,
            high,
            spread: Spread::Logarithmic,
        }
    }

    /// Share of the way from the lower to the upper end; beyond 0 to 1 outside.
    pub(super) fn place(&self, value: f64) -> f64 {
        match self.spread {
            Spread::Linear => (value - self.low) / (self.high - self.low),
            Spread::Logarithmic => (value / self.low).ln() / (self.high / self.low).ln(),
        }
    }

    /// At most about `most` ticks with their labels, from low to high.
    pub(super) fn ticks(&self, most: usize) -> Vec<(f64, String)> {
        let decades = (self.high / self.low).log10();
        if self.spread == Spread::Logarithmic && decades > 0.7 {
            return self.logarithmic_ticks(most, decades);
        }
        let step = self.step(most);
        let first = (self.low / step - 1e-6).ceil();
        let last = (self.high / step + 1e-6).floor();
        let count = (last - first).clamp(0.0, 50.0) as usize;
        (0..=count)
            .map(|k| (first + k as f64) * step)
            .filter(|value| self.spread == Spread::Linear || *value > 0.0)
            .map(|value| (value, label(value, step)))
            .collect()
    }

    fn logarithmic_ticks(&self, most: usize, decades: f64) -> Vec<(f64, String)> {
        let most = most.max(2) as f64;
        let steps: &[f64] = if 3.0 * decades <= 1.6 * most {
            &[1.0, 2.0, 5.0]
        } else {
            &[1.0]
        };
        let stride = (decades / most).ceil().max(1.0) as i32;
        let first = self.low.log10().floor() as i32;
        let last = self.high.log10().ceil() as i32;
        (first..=last)
            .filter(|decade| decade.rem_euclid(stride) == 0)
            .flat_map(|decade| steps.iter().map(move |s| s * 10_f64.powi(decade)))
            .filter(|v| *v >= self.low * (1.0 - 1e-9) && *v <= self.high * (1.0 + 1e-9))
            .map(|value| (value, label(value, 10_f64.powf(value.log10().floor()))))
            .collect()
    }

    /// The step 1, 2 or 5 times a power of ten that gives at most `most` intervals.
    fn step(&self, most: usize) -> f64 {
        let rough = (self.high - self.low) / most.max(1) as f64;
        let decade = 10_f64.powf(rough.log10().floor());
        let lead = [1.0, 2.0, 5.0, 10.0]
            .into_iter()
            .find(|lead| lead * decade >= rough * (1.0 - 1e-9));
        lead.unwrap_or(10.0) * decade
    }

    /// Enough ticks for two labels, without which an axis has no scale, where these find room.
    fn at_least_two(&self, most: usize, length: f64, room: impl Fn(usize) -> f64) -> usize {
        if self.ticks(most).len() >= 2 {
            return most;
        }
        let roomy = |more: &usize| {
            let places: Vec<f64> = self
                .ticks(*more)
                .iter()
                .map(|(value, _)| self.place(*value) * length)
                .collect();
            places.len() >= 2
                && places
                    .windows(2)
                    .all(|pair| pair[1] - pair[0] >= room(*more))
        };
        (most + 1..=most + 2).find(roomy).unwrap_or(most)
    }

    /// Widest tick label, points.
    pub(super) fn label_width(&self, most: usize) -> f64 {
        self.ticks(most)
            .iter()
            .map(|(_, label)| TEXT.width(label))
            .fold(0.0, f64::max)
    }
}

/// Ticks an axis of this length can carry.
pub(super) fn ticks_for(length: f64, room: f64) -> usize {
    ((length / room) as usize).clamp(1, 10)
}

/// Ticks a vertical axis of this length can carry.
fn side_ticks(axis: &Axis, height: f64) -> usize {
    let most = ticks_for(height, 32.0);
    axis.at_least_two(most, height, |_| 1.6 * TICK)
}

/// Room a vertical axis takes beside its frame, points.
pub(super) fn side_room(axis: &Axis, height: f64) -> f64 {
    axis.label_width(side_ticks(axis, height)) + TICK_LENGTH + 4.0 + 1.7 * LABEL
}

/// Whether faint lines cross the frame at the ticks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Grid {
    /// None: a map fills the frame.
    Without,
    /// Faint lines.
    Faint,
}

/// The axis on the left of the frame; its title runs upwards.
pub(super) fn left(sheet: &mut Sheet, frame: Frame, (axis, title): (&Axis, &str), grid: Grid) {
    let most = side_ticks(axis, frame.height());
    let fine = Stroke::solid(NARROW, GREY);
    for (value, label) in axis.ticks(most) {
        let y = frame.bottom - axis.place(value) * frame.height();
        if grid == Grid::Faint {
            sheet.line(
                &[[frame.left, y], [frame.right, y]],
                Stroke::solid(0.5, FAINT),
            );
        }
        sheet.line(&[[frame.left - TICK_LENGTH, y], [frame.left, y]], fine);
        let at = [frame.left - TICK_LENGTH - 3.0, y + 0.36 * TICK];
        sheet.text(at, label, TEXT);
    }
    sheet.line(&[[frame.left, frame.top], [frame.left, frame.bottom]], fine);
    let x = frame.left - side_room(axis, frame.height()) + LABEL;
    vertical_title(sheet, x, frame, title);
}

/// The axis on the right of the frame; its title runs upwards too.
pub(super) fn right(sheet: &mut Sheet, frame: Frame, (axis, title): (&Axis, &str)) {
    let most = side_ticks(axis, frame.height());
    let fine = Stroke::solid(NARROW, GREY);
    let widest = axis.label_width(most);
    for (value, label) in axis.ticks(most) {
        let y = frame.bottom - axis.place(value) * frame.height();
        sheet.line(&[[frame.right, y], [frame.right + TICK_LENGTH, y]], fine);
        let at = [frame.right + TICK_LENGTH + 3.0 + widest, y + 0.36 * TICK];
        sheet.text(at, label, TEXT);
    }
    sheet.line(
        &[[frame.right, frame.top], [frame.right, frame.bottom]],
        fine,
    );
    let x = frame.right + TICK_LENGTH + 6.0 + widest + LABEL;
    vertical_title(sheet, x, frame, title);
}

/// The axis below the frame; the title is left out where another panel carries it.
pub(super) fn bottom(sheet: &mut Sheet, frame: Frame, (axis, title): (&Axis, Option<&str>)) {
    let widest = axis.label_width(10).max(24.0);
    let fine = Stroke::solid(NARROW, GREY);
    let centred = Lettering {
        anchor: Anchor::Middle,
        ..TEXT
    };
    let most = ticks_for(frame.width(), widest + 16.0);
    let most = axis.at_least_two(most, frame.width(), |more| axis.label_width(more) + 6.0);
    for (value, label) in axis.ticks(most) {
        let x = frame.left + axis.place(value) * frame.width();
        sheet.line(&[[x, frame.bottom], [x, frame.bottom + TICK_LENGTH]], fine);
        if title.is_some() {
            let at = [x, frame.bottom + TICK_LENGTH + 3.0 + 0.76 * TICK];
            sheet.text(at, label, centred);
        }
    }
    sheet.line(
        &[[frame.left, frame.bottom], [frame.right, frame.bottom]],
        fine,
    );
    if let Some(title) = title {
        let x = f64::midpoint(frame.left, frame.right);
        let lettering = Lettering::plain(LABEL, INK, Anchor::Middle);
        sheet.text([x, frame.bottom + BELOW - 4.0], title, lettering);
    }
}

/// Room a titled axis takes below its frame, points.
pub(super) const BELOW: f64 = 36.0;

fn vertical_title(sheet: &mut Sheet, x: f64, frame: Frame, title: &str) {
    let lettering = Lettering {
        turn: Turn::Up,
        ..Lettering::plain(LABEL, INK, Anchor::Middle)
    };
    let title = lettering.shortened(title, frame.height().max(150.0));
    sheet.text(
        [x, f64::midpoint(frame.top, frame.bottom)],
        title,
        lettering,
    );
}

/// A value on a tick, with the digits the step between ticks needs.
fn label(value: f64, step: f64) -> String {
    if value.abs() <= 1e-9 * step {
        return "0".into();
    }
    let step_place = (step.log10() + 1e-9).floor() as i32;
    let place = (value.abs().log10() + 1e-9).floor() as i32;
    if place >= 6 || step_place < -4 {
        let digits = (place - step_place).clamp(0, 8) as usize;
        let lead = format!("{:.digits$}", value / 10_f64.powi(place));
        return match lead.as_str() {
            "1" => format!("10{}", raised(place)),
            _ => format!("{lead}·10{}", raised(place)),
        }
        .replace('-', "−");
    }
    grouped(&format!("{value:.*}", (-step_place).max(0) as usize))
}

/// A number to so many significant digits, as people write it.
pub(super) fn significant(value: f64, digits: i32) -> String {
    if !value.is_finite() || value.abs() < 1e-60 {
        return "0".into();
    }
    let place = value.abs().log10().floor() as i32;
    let step = 10_f64.powi(place - digits + 1);
    label((value / step).round() * step, step)
}

/// A given number: three significant digits without zeros that say nothing.
pub(super) fn plain(value: f64) -> String {
    let shown = significant(value, 3);
    if shown.contains('.') && !shown.contains('·') {
        shown.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        shown
    }
}

/// Thousands apart by a thin blank from five digits on, and a true minus.
fn grouped(number: &str) -> String {
    let (whole, fraction) = number.split_once('.').unwrap_or((number, ""));
    let (sign, digits) = whole
        .strip_prefix('-')
        .map_or(("", whole), |digits| ("−", digits));
    let mut shown = String::from(sign);
    for (index, digit) in digits.chars().enumerate() {
        if index > 0 && digits.len() > 4 && (digits.len() - index) % 3 == 0 {
            shown.push('\u{2009}');
        }
        shown.push(digit);
    }
    if !fraction.is_empty() {
        shown.push('.');
        shown.push_str(fraction);
    }
    shown
}

fn raised(exponent: i32) -> String {
    exponent
        .to_string()
        .chars()
        .map(|c| match c {
            '-' => '⁻',
            '1' => '¹',
            '2' => '²',
            '3' => '³',
            digit => char::from_u32(0x2070 + digit.to_digit(10).unwrap_or(0)).unwrap_or(digit),
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn labels(axis: Axis, most: usize) -> Vec<String> {
        axis.ticks(most).into_iter().map(|(_, l)| l).collect()
    }

    #[test]
    fn ticks_step_by_one_two_or_five() {
        assert_eq!(labels(Axis::over(0.0, 63.0), 5), ["0", "20", "40", "60"]);
        assert_eq!(
            labels(Axis::over(-0.02, 0.02), 4),
            ["−0.02", "−0.01", "0", "0.01", "0.02"]
        );
        assert_eq!(labels(Axis::over(0.0, 2e9), 2), ["0", "10⁹", "2·10⁹"]);
    }

    #[test]
    fn logarithmic_ticks_fill_decades() {
        assert_eq!(
            labels(Axis::logarithmic(2.0, 30000.0), 6),
            ["10", "100", "1000", "10\u{2009}000"]
        );
        assert_eq!(
            labels(Axis::logarithmic(0.02, 0.5), 8),
            ["0.02", "0.05", "0.1", "0.2", "0.5"]
        );
    }

    #[test]
    fn a_short_axis_takes_a_second_label_where_it_finds_room() {
        let axis = Axis::over(0.0, 30.0);
        assert_eq!(labels(axis, 1), ["0"]);
        let room = |_| 20.0;
        assert_eq!(labels(axis, axis.at_least_two(1, 40.0, room)), ["0", "20"]);
        assert_eq!(labels(axis, axis.at_least_two(1, 20.0, room)), ["0"]);
    }

    #[test]
    fn level_values_still_give_an_axis() {
        for value in [0.0, 1.0, -3.0, 1e-40, 1e50] {
            let axis = Axis::around(value, value);
            assert!(axis.low < axis.high && axis.place(value) >= 0.0 && axis.place(value) <= 1.0);
            assert!(!axis.ticks(5).is_empty());
        }
    }

    #[test]
    fn numbers_keep_their_digits() {
        assert_eq!(significant(2.2, 3), "2.20");
        assert_eq!(significant(12345.0, 3), "12\u{2009}300");
        assert_eq!(plain(2.2), "2.2");
        assert_eq!(plain(60.0), "60");
        assert_eq!(significant(0.001234, 2), "0.0012");
    }
}
