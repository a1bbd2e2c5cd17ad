//! Layouts of a search: resistance against bolts or mass, with small plans of the front.

use crate::{
    figures::{
        FigureError, PlanShape,
        axis::{self, Axis, BELOW, Grid},
        clip::Frame,
        drawable,
        legend::{Sample, legend},
        lettering::{Anchor, Lettering},
        ramp,
        setting::Width,
        sheet::{ACCENT, Colour, FAINT, GREY, INK, LABEL, NARROW, Sheet, Stroke, WIDE, circle},
    },
    joint::Limit,
    layout::{Answer, Goal, Row, Verdict},
    report::number::four,
    units::{Shown, System},
};

const WIDTH: f64 = 620.0;
const MARGIN: f64 = 20.0;
const HEIGHT: f64 = 250.0;
/// Plans in a row, and most of them.
const PLANS: usize = 4;
const MOST_PLANS: usize = 8;
const GAP: f64 = 14.0;
/// Room for the lines under a plan.
const CAPTION: f64 = 34.0;
const REQUIRED: Stroke = Stroke::dashed(WIDE, ACCENT, &[8.0, 3.0]);

/// A search to be drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct ArrangePlot {
    /// What was found.
    pub answer: Answer,
    /// Outlines of the plates in joint coordinates, the first plate first, m.
    pub plates: Vec<PlanShape>,
    /// Zones without heads.
    pub keep_out: Vec<PlanShape>,
    /// Radius of the head of each row, m.
    pub heads: Vec<f64>,
}

/// Draws the search.
pub(super) fn draw(plot: &ArrangePlot, units: System) -> Result<Sheet, FigureError> {
    let answer = &plot.answer;
    if answer.rows.is_empty() {
        return Err(FigureError::Empty("the search"));
    }
    if plot.heads.len() != answer.rows.len() {
        return Err(FigureError::Shape("the search"));
    }
    let points = answer
        .rows
        .iter()
        .map(|row| {
            let value = drawable(row.value(), "a layout")?;
            Ok([drawable(cost(answer, row, units), "a layout")?, value])
        })
        .collect::<Result<Vec<[f64; 2]>, FigureError>>()?;
    let limit = match answer.target.limit {
        Some((limit, bound)) => Some((drawable(limit, "the requirement")?, bound)),
        None => None,
    };
    let mut sheet = Sheet::new(WIDTH);
    let subtitle = format!(
        "{} against {}, {}",
        answer.target.measure.name(),
        cost_title(answer, units),
        match answer.cases.as_slice() {
            [only] => format!("{only} case"),
            several => format!("the worst of {}", several.join(" and ")),
        }
    );
    let top = sheet.header(&answer.title, &subtitle, Width::Full) + 10.0;
    let charted = Charted {
        answer,
        points: &points,
        limit,
        units,
    };
    let bottom = chart(&mut sheet, top, charted);
    let below = plans(&mut sheet, bottom + 12.0, plot)?;
    sheet.size[1] = below + 12.0;
    Ok(sheet)
}

fn cost(answer: &Answer, row: &Row, units: System) -> f64 {
    match answer.goal {
        Goal::Mass => units.unit(Shown::SmallMass).of(row.mass),
        Goal::Bolts | Goal::Resistance => row.places.len() as f64,
    }
}

fn cost_title(answer: &Answer, units: System) -> String {
    match answer.goal {
        Goal::Mass => format!(
            "mass of the fasteners, {}",
            units.unit(Shown::SmallMass).name
        ),
        Goal::Bolts | Goal::Resistance => "bolts".to_owned(),
    }
}

/// What the chart shows.
#[derive(Clone, Copy)]
struct Charted<'a> {
    answer: &'a Answer,
    /// Cost and resistance of every row.
    points: &'a [[f64; 2]],
    limit: Option<(f64, Limit)>,
    units: System,
}

/// The rows as dots, the front as a line, the requirement; returns the lower edge of the key.
fn chart(
    sheet: &mut Sheet,
    top: f64,
    Charted {
        answer,
        points,
        limit,
        units,
    }: Charted,
) -> f64 {
    let extent = |k: usize| {
        points
            .iter()
            .fold([f64::INFINITY, f64::NEG_INFINITY], |all, point| {
                [all[0].min(point[k]), all[1].max(point[k])]
            })
    };
    let [[few, many], [mut low, mut high]] = [extent(0), extent(1)];
    // A limit far away would squeeze the layouts into a corner.
    let near = limit.filter(|(limit, _)| *limit > low / 3.0 && *limit < 3.0 * high);
    if let Some((limit, _)) = near {
        (low, high) = (low.min(limit), high.max(limit));
    }
    let across = match answer.goal {
        Goal::Mass => Axis::around(few, many),
        // From nothing, and wide enough for ticks at whole numbers.
        Goal::Bolts | Goal::Resistance => Axis::over(0.0, (many + 1.0).max(8.0)),
    };
    let up = Axis::around(low, high);
    let frame = Frame {
        left: MARGIN + axis::side_room(&up, HEIGHT),
        top,
        right: WIDTH - MARGIN - 70.0,
        bottom: top + HEIGHT,
    };
    let title = format!("{}, K/W", answer.target.measure.name());
    axis::left(sheet, frame, (&up, &title), Grid::Faint);
    axis::bottom(sheet, frame, (&across, Some(&cost_title(answer, units))));
    let at = |[x, y]: [f64; 2]| {
        [
            frame.left + across.place(x) * frame.width(),
            frame.bottom - up.place(y) * frame.height(),
        ]
    };
    if let Some((limit, bound)) = near {
        let y = at([few, limit])[1];
        sheet.line(&[[frame.left, y], [frame.right, y]], REQUIRED);
        let sign = match bound {
            Limit::Most => '≤',
            Limit::Least => '≥',
        };
        let text = Lettering::plain(LABEL - 1.0, ACCENT, Anchor::Start);
        sheet.text([frame.right + 7.0, y - 3.0], "required", text);
        sheet.text(
            [frame.right + 7.0, y + 11.0],
            format!("{sign} {}", axis::plain(limit)),
            text,
        );
    }
    let front: Vec<[f64; 2]> = answer
        .rows
        .iter()
        .zip(points)
        .filter(|(row, _)| row.front)
        .map(|(_, point)| at(*point))
        .collect();
    sheet.line_within(frame, &front, Stroke::solid(NARROW, GREY));
    for (index, (row, point)) in answer.rows.iter().zip(points).enumerate() {
        let place = at(*point);
        sheet.disc(place, 4.0, colour(row));
        if answer.best == Some(index) {
            sheet.line(&ring(place, 7.5), Stroke::solid(WIDE, ACCENT));
        }
    }
    let key = [
        (Sample::Dot(MET), "meets it throughout its band".to_owned()),
        (Sample::Dot(NOMINAL), "at nominal".to_owned()),
        (Sample::Dot(NOT), "does not".to_owned()),
        (Sample::Dot(FAINT), "screened only".to_owned()),
        (Sample::Ring(Stroke::solid(WIDE, ACCENT)), "best".to_owned()),
    ];
    let room = Frame {
        left: MARGIN,
        top: frame.bottom + BELOW + 6.0,
        right: WIDTH - MARGIN,
        bottom: f64::INFINITY,
    };
    legend(sheet, room, &key)
}

const MET: Colour = Colour(0x12, 0x4E, 0x6B);
const NOMINAL: Colour = Colour(0x6F, 0xA3, 0xBF);
const NOT: Colour = Colour(0x9A, 0xA2, 0xA8);

fn colour(row: &Row) -> Colour {
    match row.verdict {
        Verdict::Met => MET,
        Verdict::ByForce | Verdict::AtNominal => NOMINAL,
        Verdict::NotMet | Verdict::Failed(_) => NOT,
        Verdict::Screened => FAINT,
    }
}

/// Small plans of the front; returns their lower edge.
fn plans(sheet: &mut Sheet, top: f64, plot: &ArrangePlot) -> Result<f64, FigureError> {
    let rows = plot.answer.rows.iter().zip(&plot.heads).enumerate();
    let shown: Vec<(usize, (&Row, &f64))> = rows
        .filter(|(index, (row, _))| row.front || plot.answer.best == Some(*index))
        .take(MOST_PLANS)
        .collect();
    let Some(first) = plot.plates.first() else {
        return Ok(top);
    };
    let outline = points(first);
    let bounds = outline.iter().fold(
        [[f64::INFINITY; 2], [f64::NEG_INFINITY; 2]],
        |[low, high], point| {
            [
                [low[0].min(point[0]), low[1].min(point[1])],
                [high[0].max(point[0]), high[1].max(point[1])],
            ]
        },
    );
    let [low, high] = bounds;
    let size = [0, 1].map(|k| high[k] - low[k]);
    if !(size[0] > 0.0 && size[1] > 0.0 && size[0].is_finite() && size[1].is_finite()) {
        return Err(FigureError::Shape("the first plate"));
    }
    let width = (WIDTH - 2.0 * MARGIN - (PLANS - 1) as f64 * GAP) / PLANS as f64;
    let scale = (width / size[0]).min(150.0 / size[1]);
    let height = scale * size[1];
    let mut bottom = top;
    for (place, (index, (row, head))) in shown.into_iter().enumerate() {
        let left =
            MARGIN + (place % PLANS) as f64 * (width + GAP) + 0.5 * (width - scale * size[0]);
        let upper = top + (place / PLANS) as f64 * (height + CAPTION + GAP);
        let at = |point: [f64; 2]| {
            [
                left + scale * (point[0] - low[0]),
                upper + scale * (high[1] - point[1]),
            ]
        };
        let shape = |shape: &PlanShape| -> Vec<[f64; 2]> {
            let mut line: Vec<[f64; 2]> = points(shape).into_iter().map(at).collect();
            line.extend(line.first().copied());
            line
        };
        for zone in &plot.keep_out {
            sheet.area(shape(zone), FAINT);
        }
        let best = plot.answer.best == Some(index);
        let stroke = if best {
            Stroke::solid(WIDE, ACCENT)
        } else {
            Stroke::solid(NARROW, INK)
        };
        sheet.line(&shape(first), stroke);
        for bolt in &row.places {
            let centre = at(*bolt);
            sheet.line(&ring(centre, scale * head), Stroke::solid(NARROW, INK));
            sheet.disc(centre, 1.6, ramp::colour(0.85));
        }
        let text = Lettering::plain(LABEL - 1.0, INK, Anchor::Start);
        let lines = [
            format!("{} × {}", row.places.len(), row.label),
            format!("{} K/W", four(row.value())),
        ];
        for (line, words) in lines.iter().enumerate() {
            let y = upper + height + 13.0 + 13.0 * line as f64;
            sheet.text([left, y], text.shortened(words, width), text);
        }
        bottom = bottom.max(upper + height + CAPTION);
    }
    Ok(bottom)
}

/// A circle as a closed line.
fn ring(centre: [f64; 2], radius: f64) -> Vec<[f64; 2]> {
    let mut line = circle(centre, radius);
    line.extend(line.first().copied());
    line
}

/// Points around a shape, m.
fn points(shape: &PlanShape) -> Vec<[f64; 2]> {
    match shape {
        PlanShape::Rectangle { corner, size } => {
            let [x, y] = *corner;
            let [w, h] = *size;
            vec![[x, y], [x + w, y], [x + w, y + h], [x, y + h]]
        }
        PlanShape::Disc { centre, radius } => circle(*centre, *radius),
        PlanShape::Polygon(points) => points.clone(),
    }
}
