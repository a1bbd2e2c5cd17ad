//! Where contact ends, as lines drawn from the cells of a solved field.

use std::collections::BTreeMap;

use crate::estimate::FieldMap;

/// Rounds of smoothing, which take the stairs of the cells out of the line.
const ROUNDS: usize = 2;

/// The lines between cells under pressure and cells without, joint coordinates, m.
///
/// The share of touching neighbours is smoothed over the cells and followed at one half (marching
/// squares). The line stands off a circle of `n` cells radius by `1/(2n)` of a cell.
pub(super) fn contact_edge(field: &FieldMap) -> Vec<Vec<[f64; 2]>> {
    let [columns, rows] = field.size;
    if columns < 2 || rows < 2 || columns.checked_mul(rows) != Some(field.pressure.len()) {
        return Vec::new();
    }
    let mut share: Vec<f64> = field
        .pressure
        .iter()
        .map(|pressure| match pressure {
            p if p.is_nan() => f64::NAN,
            p if *p > 0.0 => 1.0,
            _ => 0.0,
        })
        .collect();
    for _ in 0..ROUNDS {
        share = smoothed(&share, columns);
    }
    Lines::through(&share, field.size).chained(field)
}

/// Every cell as the mean of its block, weighted 1-2-1 each way; cells without a face have no say.
fn smoothed(share: &[f64], columns: usize) -> Vec<f64> {
    let rows = share.len() / columns;
    let mut smooth = Vec::with_capacity(share.len());
    for row in 0..rows {
        for column in 0..columns {
            if share[row * columns + column].is_nan() {
                smooth.push(f64::NAN);
                continue;
            }
            let (mut sum, mut weights) = (0.0, 0.0);
            for r in row.saturating_sub(1)..(row + 2).min(rows) {
                for c in column.saturating_sub(1)..(column + 2).min(columns) {
                    let value = share[r * columns + c];
                    if !value.is_nan() {
                        let weight = f64::from(1 + u8::from(r == row))
                            * f64::from(1 + u8::from(c == column));
                        sum += weight * value;
                        weights += weight;
                    }
                }
            }
            smooth.push(sum / weights);
        }
    }
    smooth
}

/// Crossings of one half between neighbouring cells, and which follow each other.
struct Lines {
    /// Place in cells from the lower left centre, by the number of the side it lies on.
    places: BTreeMap<usize, [f64; 2]>,
    /// The one or two crossings next to each.
    next: BTreeMap<usize, Vec<usize>>,
}

impl Lines {
    fn through(share: &[f64], [columns, rows]: [usize; 2]) -> Self {
        let mut lines = Self {
            places: BTreeMap::new(),
            next: BTreeMap::new(),
        };
        for row in 0..rows - 1 {
            for column in 0..columns - 1 {
                let corners = [[0, 0], [1, 0], [1, 1], [0, 1]]
                    .map(|[c, r]| share[(row + r) * columns + column + c]);
                if corners.iter().any(|corner| corner.is_nan()) {
                    continue;
                }
                lines.cross(corners, [column, row], columns);
            }
        }
        lines
    }

    /// Follows the line through one square of four cell centres.
    fn cross(&mut self, corners: [f64; 4], [column, row]: [usize; 2], columns: usize) {
        let home = row * columns + column;
        // Each side of the square belongs to the cell at its lower or left end: across or up.
        let sides = [
            2 * home,
            2 * (home + 1) + 1,
            2 * (home + columns),
            2 * home + 1,
        ];
        let offsets = [[0.0, 0.0], [1.0, 0.0], [1.0, 1.0], [0.0, 1.0]];
        let mut met = Vec::with_capacity(4);
        for (from, side) in sides.into_iter().enumerate() {
            let to = (from + 1) % 4;
            let (a, b) = (corners[from] - 0.5, corners[to] - 0.5);
            if (a > 0.0) == (b > 0.0) {
                continue;
            }
            let t = a / (a - b);
            let at = |k: usize| offsets[from][k] + t * (offsets[to][k] - offsets[from][k]);
            let place = [column as f64 + at(0), row as f64 + at(1)];
            self.places.insert(side, place);
            met.push(side);
        }
        match met.as_slice() {
            [one, other] => self.join(*one, *other),
            // Two corners across touch: the middle says whether they touch each other.
            [first, second, third, fourth] => {
                let middle = corners.iter().sum::<f64>() / 4.0 > 0.5;
                if middle == (corners[0] > 0.5) {
                    self.join(*first, *second);
                    self.join(*third, *fourth);
                } else {
                    self.join(*fourth, *first);
                    self.join(*second, *third);
                }
            }
            _ => {}
        }
    }

    fn join(&mut self, one: usize, other: usize) {
        self.next.entry(one).or_default().push(other);
        self.next.entry(other).or_default().push(one);
    }

    /// The crossings in turn: open lines from their ends first, then closed ones.
    fn chained(mut self, field: &FieldMap) -> Vec<Vec<[f64; 2]>> {
        let ends = self.next.iter().filter(|(_, next)| next.len() == 1);
        let mut starts: Vec<usize> = ends.map(|(side, _)| *side).collect();
        starts.extend(self.next.keys().copied());
        let mut lines = Vec::new();
        for start in starts {
            let mut line = vec![start];
            let mut here = start;
            while let Some(to) = self.next.get_mut(&here).and_then(Vec::pop) {
                if let Some(back) = self.next.get_mut(&to) {
                    back.retain(|side| *side != here);
                }
                line.push(to);
                here = to;
            }
            if line.len() > 1 {
                lines.push(line.iter().map(|side| self.place(*side, field)).collect());
            }
        }
        lines
    }

    fn place(&self, side: usize, field: &FieldMap) -> [f64; 2] {
        let cell = self.places.get(&side).copied().unwrap_or([f64::NAN; 2]);
        let [left, lower, right, upper] = field.window;
        let share = [0, 1].map(|k| (cell[k] + 0.5) / field.size[k] as f64);
        [
            left + share[0] * (right - left),
            lower + share[1] * (upper - lower),
        ]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A field pressed within a radius, cells, around the middle of the window.
    fn pressed(radius: f64) -> FieldMap {
        let size = [60_usize, 40];
        let pressure = (0..size[0] * size[1])
            .map(|k| {
                let [x, y] = [(k % 60) as f64 + 0.5 - 30.0, (k / 60) as f64 + 0.5 - 20.0];
                if x.hypot(y) < radius { 1e6 } else { 0.0 }
            })
            .collect();
        FieldMap {
            window: [0.0, 0.0, 0.06, 0.04],
            size,
            conductance: vec![1.0; size[0] * size[1]],
            gap: None,
            pressure,
        }
    }

    #[test]
    fn the_edge_of_a_round_contact_is_one_round_line() {
        let lines = contact_edge(&pressed(12.0));
        assert_eq!(lines.len(), 1);
        let line = &lines[0];
        assert_eq!(line.first(), line.last());
        for [x, y] in line {
            let radius = (x - 0.03).hypot(y - 0.02);
            // A cell is 1 mm; the centres that decide lie within half a cell of the circle.
            assert!((radius - 0.012).abs() < 0.6e-3, "{radius}");
        }
    }

    #[test]
    fn a_contact_that_reaches_the_rim_has_an_open_edge() {
        let lines = contact_edge(&pressed(25.0));
        assert_eq!(lines.len(), 2, "left and right of a band across the window");
        assert!(lines.iter().all(|line| line.first() != line.last()));
    }

    #[test]
    fn a_field_of_one_kind_has_no_edge() {
        assert!(contact_edge(&pressed(0.0)).is_empty());
        assert!(contact_edge(&pressed(100.0)).is_empty());
        let mut broken = pressed(12.0);
        broken.size = [usize::MAX, 2];
        assert!(contact_edge(&broken).is_empty());
    }
}
