//! Flatness maps: the table beside the joint file.

mod table;

use std::sync::Arc;

use crate::{
    diagnostic::Fault,
    joint::{
        FlatnessMap, Outline,
        collector::{Collector, MOST_FAULTS, Wording, fault},
        maps::table::Row,
        record::Record,
        tree::{Span, short},
    },
    numerics::polygon,
    units::{self, Quantity},
};

/// Longest table, bytes.
pub const LONGEST_TABLE: usize = 10_000_000;

/// Most points of a map.
const MOST_POINTS: usize = 100_000;

/// Points nearer than this are one, m.
const SAME_PLACE: f64 = 1e-9;

/// Points may lie outside the bounds of the plate by this share of their diagonal.
const MARGIN: f64 = 0.1;

/// Largest height either way, m; that of a bow.
const HIGHEST: f64 = 0.1;

/// Where the texts of files come from that a joint file names.
pub type Files<'f> = dyn Fn(&str) -> Result<String, String> + 'f;

/// The tables beside a joint file. Spans in them count on from the end of what was read before.
pub(super) struct Tables<'f> {
    files: &'f Files<'f>,
    /// Where the next text starts.
    start: usize,
    /// Names and texts read so far.
    pub read: Vec<(String, String)>,
}

impl<'f> Tables<'f> {
    /// No table read yet; the first would start `start` bytes into the joined text.
    pub(super) fn new(files: &'f Files<'f>, start: usize) -> Self {
        Self {
            files,
            start,
            read: Vec::new(),
        }
    }

    /// Reads the flatness map of a plate; none when it states none or a faulty one.
    pub(super) fn flatness(
        &mut self,
        plate: &Record,
        outline: Option<&Outline>,
        collector: &mut Collector,
    ) -> Option<Arc<FlatnessMap>> {
        let name = plate.text("flatness_map")?;
        let text = match (self.files)(name) {
            Ok(text) => text,
            Err(why) => {
                collector.report(
                    fault(
                        "map/unreadable",
                        &plate.span("flatness_map"),
                        format!("`{}` cannot be read: {why}", short(name)),
                    )
                    .expecting("expected a table beside the joint file")
                    .help("the path is relative to the folder of the joint file"),
                );
                return None;
            }
        };
        let start = self.start;
        self.start += text.len() + 1;
        self.read.push((name.to_owned(), text));
        let text = &self.read.last()?.1;
        let mut faults = Vec::new();
        let map = map(text, outline, &mut faults);
        for mut told in faults {
            told.span = told.span.start + start..told.span.end + start;
            collector.report(told);
        }
        map.map(Arc::new)
    }
}

/// Reads a flatness map by itself, against the outline of its plate where there is one.
///
/// Errors: every fault found; spans count bytes of `text`.
pub fn read_flatness(text: &str, outline: Option<&Outline>) -> Result<FlatnessMap, Vec<Fault>> {
    let mut faults = Vec::new();
    map(text, outline, &mut faults).ok_or(faults)
}

fn map(text: &str, outline: Option<&Outline>, faults: &mut Vec<Fault>) -> Option<FlatnessMap> {
    if text.len() > LONGEST_TABLE {
        faults.push(
            fault(
                "map/points",
                &(0..0),
                format!("the table has {} bytes", text.len()),
            )
            .expecting(format!("expected at most {LONGEST_TABLE} bytes"))
            .help("thin the points out: a few thousand describe a face"),
        );
        return None;
    }
    let rows = table::rows(text, faults);
    let whole = 0..text.trim_end().len();
    if rows.len() > MOST_POINTS {
        faults.push(
            fault(
                "map/points",
                &rows[MOST_POINTS].span,
                format!("the map has {} points", rows.len()),
            )
            .expecting(format!("expected at most {MOST_POINTS}"))
            .help("thin the points out: a few thousand describe a face"),
        );
        return None;
    }
    twice(&rows, faults);
    if let Some(outline) = outline {
        outside(&rows, outline, faults);
    }
    let high = rows.iter().filter(|row| row.point[2].abs() > HIGHEST);
    for row in high.take(MOST_FAULTS) {
        faults.push(
            fault(
                "map/points",
                &row.span,
                format!(
                    "a height of {} is no flatness",
                    units::show(row.point[2], Quantity::Length)
                ),
            )
            .expecting("expected within 100 mm either way")
            .help("check the unit of z in the header: `z [µm]`"),
        );
    }
    if !faults.is_empty() {
        return None;
    }
    let count = rows.len();
    let map = FlatnessMap::new(rows.into_iter().map(|row| row.point).collect());
    if map.is_none() {
        faults.push(
            fault(
                "map/points",
                &whole,
                if count < 3 {
                    format!("the map has {count} points")
                } else {
                    format!("the {count} points of the map lie on one line")
                },
            )
            .expecting("expected three points or more that are not on one line")
            .help("a face is described by points all over it, for example on a grid of 5 by 5"),
        );
    }
    map
}

/// Tells of points that stand twice in plan.
fn twice(rows: &[Row], faults: &mut Vec<Fault>) {
    let cell = |row: &Row| [row.point[0], row.point[1]].map(|at| (at / SAME_PLACE).round() as i64);
    let mut order: Vec<(&Row, [i64; 2])> = rows.iter().map(|row| (row, cell(row))).collect();
    // A stable sort keeps equal places in the order of the lines.
    order.sort_by_key(|(_, cell)| *cell);
    let pairs = order.windows(2).filter(|pair| pair[0].1 == pair[1].1);
    for pair in pairs.take(MOST_FAULTS) {
        faults.push(
            fault(
                "map/points",
                &pair[1].0.span,
                format!("this point stands already on line {}", pair[0].0.line),
            )
            .expecting("expected each point once")
            .help("keep one of the two, or their mean"),
        );
    }
}

/// Tells of points that lie far outside the plate.
fn outside(rows: &[Row], outline: &Outline, faults: &mut Vec<Fault>) {
    let [left, lower, right, upper] = outline.bounds();
    let margin = MARGIN * (right - left).hypot(upper - lower);
    let plan: Vec<[f64; 2]> = rows
        .iter()
        .map(|row| [row.point[0], row.point[1]])
        .collect();
    let [least_x, least_y, most_x, most_y] = polygon::bounds(&plan);
    for row in rows {
        let [x, y, _] = row.point;
        let near =
            x >= left - margin && x <= right + margin && y >= lower - margin && y <= upper + margin;
        if !near {
            let shown = |value: f64| units::show(value, Quantity::Length);
            faults.push(
                fault(
                    "map/points",
                    &row.span,
                    format!("({}, {}) lies far outside the plate", shown(x), shown(y)),
                )
                .expecting(format!(
                    "expected x from {} to {}, y from {} to {}",
                    shown(left),
                    shown(right),
                    shown(lower),
                    shown(upper)
                ))
                .help(format!(
                    "points are in the plate's own coordinates, and the map reaches from ({}, {}) to ({}, {}): \
                     check unit and origin",
                    shown(least_x),
                    shown(least_y),
                    shown(most_x),
                    shown(most_y)
                )),
            );
            // A wrong unit puts all points outside; one says it.
            return;
        }
    }
}

/// Keeps spans of one line.
pub(super) fn line_span(start: usize, line: &str) -> Span {
    let lead = line.len() - line.trim_start().len();
    start + lead..start + line.trim_end().len().max(lead)
}
