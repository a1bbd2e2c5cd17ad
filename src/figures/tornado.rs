//! What each input alone does to an answer: bars about the nominal, the longest on top.

use crate::{
    figures::{
        FigureError,
        axis::{self, Axis, BELOW},
        clip::Frame,
        drawable,
        legend::{Sample, legend},
        lettering::{Anchor, Lettering},
        ramp,
        setting::Width,
        sheet::{ACCENT, Colour, FAINT, GREY, INK, LABEL, NARROW, Sheet, Stroke},
    },
    uncertainty::{Ranked, Ranking},
};

const WIDTH: f64 = 620.0;
/// Height of a row, of its bar, and of the line inside it.
const ROW: f64 = 26.0;
const BAR: f64 = 15.0;
/// Most inputs that are drawn; the rest moves next to nothing.
const MOST: usize = 14;
/// Most room the names may take, and on a narrow sheet, where they take two lines.
const NAMES: [f64; 2] = [230.0, 112.0];

const NOMINAL: Stroke = Stroke::solid(1.2, INK);
const BAND: Stroke = Stroke::dashed(NARROW, ACCENT, &[5.0, 3.0]);
const NAME: Lettering = Lettering::plain(LABEL - 0.5, INK, Anchor::End);
const VALUE: Lettering = Lettering::plain(LABEL - 2.0, GREY, Anchor::Start);

/// One bar.
struct Bar {
    name: &'static str,
    /// At the 5 % and the 95 % quantile of the input.
    ends: [f64; 2],
    total: f64,
}

/// Draws the ranking.
pub(super) fn draw(ranking: &Ranking, width: Width) -> Result<Sheet, FigureError> {
    let nominal = drawable(ranking.band.nominal, "the nominal answer")?;
    let bars = bars(ranking)?;
    let band = [ranking.band.low, ranking.band.high]
        .into_iter()
        .flatten()
        .map(|end| drawable(end, "the band"))
        .collect::<Result<Vec<f64>, FigureError>>()?;
    let all = || {
        bars.iter()
            .flat_map(|bar| bar.ends)
            .chain(band.iter().copied())
            .chain([nominal])
    };
    let axis = Axis::around(
        all().fold(f64::INFINITY, f64::min),
        all().fold(f64::NEG_INFINITY, f64::max),
    );
    let names = bars
        .iter()
        .map(|bar| NAME.width(bar.name))
        .fold(0.0, f64::max);
    let margin = width.margin();
    let (most, lines) = match width {
        Width::Full => (NAMES[0], 1),
        Width::Narrow => (NAMES[1], 2),
    };
    let names = names.min(most);
    let left = margin + names + 10.0;
    let right = width.sheet(WIDTH) - margin - VALUE.width("100 %") - 10.0;

    let mut sheet = Sheet::new(width.sheet(WIDTH));
    let subtitle = format!(
        "{} when each input alone goes from its 5 % to its 95 %, {} case",
        ranking.target.name(),
        ranking.case
    );
    let top = sheet.header(&ranking.title, &subtitle, width) + 22.0;
    let frame = Frame {
        left,
        top,
        right,
        bottom: top + ROW * bars.len() as f64 + 6.0,
    };
    let across = |value: f64| left + axis.place(value) * frame.width();
    sheet.text(
        [right + 8.0, top - 6.0],
        "total share",
        Lettering {
            anchor: Anchor::Middle,
            ..VALUE
        },
    );
    for (row, bar) in bars.iter().enumerate() {
        let middle = top + 3.0 + ROW * (row as f64 + 0.5);
        draw_bar(&mut sheet, bar, (middle, across(nominal)), &across);
        let name = NAME.wrapped(bar.name, names, lines);
        let first = middle + 0.36 * NAME.size - 6.0 * (name.len() - 1) as f64;
        for (line, words) in name.into_iter().enumerate() {
            sheet.text([left - 8.0, first + 12.0 * line as f64], words, NAME);
        }
        if bar.total.is_finite() {
            let share = format!("{:.0}\u{a0}%", (100.0 * bar.total).round() + 0.0);
            sheet.text([right + 8.0, middle + 0.36 * VALUE.size], share, VALUE);
        }
    }
    for end in &band {
        let x = across(*end);
        sheet.line_within(frame, &[[x, frame.top], [x, frame.bottom]], BAND);
    }
    let x = across(nominal);
    sheet.line(&[[x, frame.top], [x, frame.bottom]], NOMINAL);
    let title = format!("{}, {}", ranking.target.name(), ranking.target.unit());
    axis::bottom(&mut sheet, frame, (&axis, Some(&title)));
    let room = Frame {
        left: margin,
        top: frame.bottom + BELOW + 6.0,
        right: width.sheet(WIDTH) - margin,
        bottom: f64::INFINITY,
    };
    sheet.size[1] = legend(&mut sheet, room, &key(&band)) + 12.0;
    Ok(sheet)
}

/// From the nominal to both ends, the side of the 5 % lighter.
fn draw_bar(
    sheet: &mut Sheet,
    bar: &Bar,
    (middle, nominal): (f64, f64),
    across: &impl Fn(f64) -> f64,
) {
    let [top, bottom] = [middle - 0.5 * BAR, middle + 0.5 * BAR];
    sheet.line(
        &[[nominal, middle], [nominal, middle]],
        Stroke::solid(NARROW, FAINT),
    );
    // Where both ends lie on one side the shorter is drawn over the longer.
    let mut ends = [(bar.ends[0], lower()), (bar.ends[1], upper())];
    let reach = |end: f64| (across(end) - nominal).abs();
    if reach(ends[0].0) < reach(ends[1].0) {
        ends.swap(0, 1);
    }
    for (end, colour) in ends {
        let x = across(end);
        if (x - nominal).abs() > 0.05 {
            sheet.area(
                vec![[nominal, top], [x, top], [x, bottom], [nominal, bottom]],
                colour,
            );
        }
    }
}

fn lower() -> Colour {
    Colour(0xA9, 0xC9, 0xDB)
}

fn upper() -> Colour {
    ramp::colour(0.75)
}

/// The inputs that move the answer most, by the length of their bars.
fn bars(ranking: &Ranking) -> Result<Vec<Bar>, FigureError> {
    let bar = |input: &Ranked| -> Result<Bar, FigureError> {
        Ok(Bar {
            name: input.input,
            ends: [
                drawable(input.alone[0], "the bar of an input")?,
                drawable(input.alone[1], "the bar of an input")?,
            ],
            total: input.index.total.value,
        })
    };
    let mut bars = ranking
        .inputs
        .iter()
        .map(bar)
        .collect::<Result<Vec<Bar>, FigureError>>()?;
    if bars.is_empty() {
        return Err(FigureError::Empty("the ranking"));
    }
    let nominal = ranking.band.nominal;
    let length = |bar: &Bar| {
        let [low, high] = bar.ends;
        low.max(high).max(nominal) - low.min(high).min(nominal)
    };
    bars.sort_by(|one, other| length(other).total_cmp(&length(one)));
    bars.truncate(MOST);
    Ok(bars)
}

fn key(band: &[f64]) -> Vec<(Sample, String)> {
    let mut items = vec![
        (Sample::Patch(lower()), "input at its 5 %".to_owned()),
        (Sample::Patch(upper()), "input at its 95 %".to_owned()),
        (Sample::Line(NOMINAL), "nominal".to_owned()),
    ];
    if !band.is_empty() {
        items.push((
            Sample::Line(BAND),
            "low and high of all inputs together".to_owned(),
        ));
    }
    items
}
