//! Layouts by rule: along the edges, in columns and rows, on a circle; and lattices of free places.

use std::f64::consts::{PI, TAU};

use crate::{
    joint::{Arrange, Family, Joint, Symmetry},
    layout::constraints::{Constraints, step},
};

/// Margins tried along each axis: the least and some steps more.
const MARGINS: usize = 4;
/// Circles tried.
const CIRCLES: usize = 8;
/// Largest margin as a share of a side: beyond it the rows of two edges are one row.
const WIDEST_MARGIN: f64 = 0.35;

/// A layout before it is judged.
#[derive(Clone, Debug, PartialEq)]
pub struct Pattern {
    /// Its family.
    pub family: Family,
    /// Places, m, whole micrometres.
    pub places: Vec<[f64; 2]>,
}

/// A coordinate as a file states it: whole micrometres, as the reader makes it of its text.
pub(super) fn rounded(metres: f64) -> f64 {
    let text = format!("{:.3}", metres * 1e3);
    text.parse::<f64>().map_or(metres, |mm| mm / 1e3)
}

pub(super) fn rounded_place(place: [f64; 2]) -> [f64; 2] {
    place.map(rounded)
}

/// Every layout by rule that keeps its distances, in a fixed order.
pub fn rule_patterns(joint: &Joint, arrange: &Arrange, constraints: &Constraints) -> Vec<Pattern> {
    let mut found: Vec<Pattern> = Vec::new();
    let mut consider = |family: Family, places: Vec<[f64; 2]>| {
        let places: Vec<[f64; 2]> = places.into_iter().map(rounded_place).collect();
        if constraints.miss(&places) <= 0.0 {
            found.push(Pattern { family, places });
        }
    };
    let [fewest, most] = arrange.bolts;
    let wanted = |count: usize| (fewest..=most).contains(&count);
    let edges = arrange.families.contains(&Family::Edge);
    for columns in 1..=most {
        for rows in 1..=most {
            let all = columns * rows;
            let rim = if columns.min(rows) > 1 {
                2 * (columns + rows) - 4
            } else {
                all
            };
            for margins in margins(joint, arrange, (constraints.edge_distance, [columns, rows])) {
                let grid = || grid(joint, [columns, rows], margins);
                if edges && wanted(rim) && columns.min(rows) > 1 {
                    let outer = grid().into_iter().enumerate().filter(|(index, _)| {
                        let (column, row) = (index % columns, index / columns);
                        column == 0 || row == 0 || column + 1 == columns || row + 1 == rows
                    });
                    consider(Family::Edge, outer.map(|(_, place)| place).collect());
                }
                // Two rows are edges, and told as such.
                if arrange.families.contains(&Family::Grid)
                    && wanted(all)
                    && !(edges && columns.min(rows) == 2)
                {
                    consider(Family::Grid, grid());
                }
            }
        }
    }
    if arrange.families.contains(&Family::Circle) {
        let [low, high] = corners(joint);
        let centre = [0, 1].map(|k| f64::midpoint(low[k], high[k]));
        let widest = 0.5 * (high[0] - low[0]).min(high[1] - low[1]) - constraints.edge_distance;
        let step = step(joint, arrange);
        for count in fewest.max(2)..=most {
            for circle in 0..CIRCLES {
                let radius = widest - circle as f64 * 0.5 * step;
                if radius <= 0.0 {
                    break;
                }
                for start in [0.0, PI / count as f64] {
                    let places = (0..count).map(|bolt| {
                        let angle = start + TAU * bolt as f64 / count as f64;
                        [
                            centre[0] + radius * angle.cos(),
                            centre[1] + radius * angle.sin(),
                        ]
                    });
                    consider(Family::Circle, places.collect());
                }
            }
        }
    }
    found
}

/// Lower left and upper right corner of the first plate, m.
fn corners(joint: &Joint) -> [[f64; 2]; 2] {
    let [left, lower, right, upper] = joint.warm().bounds();
    [[left, lower], [right, upper]]
}

/// Margins along both axes, the least first; one column stands in the middle whatever its margin.
fn margins(joint: &Joint, arrange: &Arrange, (least, counts): (f64, [usize; 2])) -> Vec<[f64; 2]> {
    let [low, high] = corners(joint);
    let step = step(joint, arrange);
    let along = |axis: usize| -> Vec<f64> {
        let tried = if counts[axis] == 1 { 1 } else { MARGINS };
        (0..tried)
            .map(|index| least + index as f64 * step)
            .filter(|margin| *margin <= (WIDEST_MARGIN * (high[axis] - low[axis])).max(least))
            .collect()
    };
    let (across, up) = (along(0), along(1));
    let pairs = across.iter().flat_map(|x| up.iter().map(move |y| [*x, *y]));
    pairs.collect()
}

fn grid(joint: &Joint, counts: [usize; 2], margins: [f64; 2]) -> Vec<[f64; 2]> {
    let [low, high] = corners(joint);
    let at = |axis: usize, index: usize| {
        let (from, to) = (low[axis] + margins[axis], high[axis] - margins[axis]);
        if counts[axis] == 1 {
            f64::midpoint(from, to)
        } else {
            from + (to - from) * index as f64 / (counts[axis] - 1) as f64
        }
    };
    let count = counts[0] * counts[1];
    let places = (0..count).map(|index| [at(0, index % counts[0]), at(1, index / counts[0])]);
    places.collect()
}

/// Places that are mirrored into each other.
pub(super) type Orbit = Vec<[f64; 2]>;

/// A place this near to a mirror line stands on it, m.
const ON_MIRROR: f64 = 5e-6;

/// Along which axes a place stands on a mirror line, from which no mirrored layout moves it.
pub(super) fn on_mirror(joint: &Joint, symmetry: Symmetry, place: [f64; 2]) -> [bool; 2] {
    let [low, high] = corners(joint);
    let mirrors = [
        matches!(symmetry, Symmetry::X | Symmetry::Both),
        matches!(symmetry, Symmetry::Y | Symmetry::Both),
    ];
    [0, 1].map(|k| {
        let middle = f64::midpoint(low[k], high[k]);
        mirrors[k] && (place[k] - middle).abs() <= ON_MIRROR
    })
}

/// A place with its mirror images, each once.
pub(super) fn orbit(joint: &Joint, symmetry: Symmetry, place: [f64; 2]) -> Orbit {
    let [low, high] = corners(joint);
    let held = on_mirror(joint, symmetry, place);
    let place = [0, 1].map(|k| {
        if held[k] {
            f64::midpoint(low[k], high[k])
        } else {
            place[k]
        }
    });
    let mirrored = |[x, y]: [f64; 2], [across, up]: [bool; 2]| {
        [
            if across { low[0] + high[0] - x } else { x },
            if up { low[1] + high[1] - y } else { y },
        ]
    };
    let images: &[[bool; 2]] = match symmetry {
        Symmetry::None => &[[false, false]],
        Symmetry::X => &[[false, false], [true, false]],
        Symmetry::Y => &[[false, false], [false, true]],
        Symmetry::Both => &[[false, false], [true, false], [false, true], [true, true]],
    };
    let mut orbit: Orbit = Vec::new();
    for image in images {
        let place = rounded_place(mirrored(place, *image));
        let known = |other: &[f64; 2]| (other[0] - place[0]).hypot(other[1] - place[1]) < 1e-5;
        if !orbit.iter().any(known) {
            orbit.push(place);
        }
    }
    orbit
}

/// Orbits of the lattice that keep their distances, in a fixed order.
///
/// The lattice is centred on the first plate, so that it is its own mirror image, and ends at the
/// least edge distance.
pub(super) fn orbits(joint: &Joint, arrange: &Arrange, constraints: &Constraints) -> Vec<Orbit> {
    let [low, high] = corners(joint);
    let step = step(joint, arrange);
    let along = |axis: usize| -> Vec<f64> {
        let from = low[axis] + constraints.edge_distance;
        let to = high[axis] - constraints.edge_distance;
        if to < from {
            return Vec::new();
        }
        // An even number, so that places stand on the middle line too.
        let steps = 2 * (0.5 * (to - from) / step).round().max(1.0) as usize;
        (0..=steps)
            .map(|index| from + (to - from) * index as f64 / steps as f64)
            .collect()
    };
    let (across, up) = (along(0), along(1));
    let mut found: Vec<Orbit> = Vec::new();
    for y in &up {
        for x in &across {
            let orbit = orbit(joint, arrange.symmetry, [*x, *y]);
            let first = orbit.iter().fold([f64::INFINITY; 2], |least, place| {
                if (place[1], place[0]) < (least[1], least[0]) {
                    *place
                } else {
                    least
                }
            });
            // Each orbit once, at the first of its places in the order of the lattice.
            let here = rounded_place([*x, *y]);
            let is_first = (first[0] - here[0]).hypot(first[1] - here[1]) < 1e-5;
            if is_first && constraints.miss(&orbit) <= 0.0 {
                found.push(orbit);
            }
        }
    }
    found
}
