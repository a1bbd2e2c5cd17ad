//! The field of a plan map as an image, finer than its cells and cut at the true edges.

use crate::figures::{
    axis::Axis,
    picture::{NOTHING, Picture},
    plan::{PlanMap, PlanShape, View},
    ramp,
};

/// Pixels to the point; the final image has as many.
const FINENESS: f64 = 2.0;

/// The image of the field.
pub(super) fn picture(map: &PlanMap, view: &View, colours: &Axis) -> Picture {
    let size = [view.frame.width(), view.frame.height()]
        .map(|length| ((length * FINENESS).round() as usize).max(1));
    let field = Field {
        map,
        holes: map
            .bolts
            .iter()
            .map(|bolt| PlanShape::Disc {
                centre: bolt.at,
                radius: bolt.hole_radius,
            })
            .collect(),
    };
    let mut indices = Vec::with_capacity(size[0] * size[1]);
    for row in 0..size[1] {
        let v = 1.0 - (row as f64 + 0.5) / size[1] as f64;
        for column in 0..size[0] {
            let u = (column as f64 + 0.5) / size[0] as f64;
            indices.push(match field.at([u, v]) {
                Some(value) => {
                    let share = colours.place(value * map.factor);
                    // A logarithm of zero or below is under every colour: the lightest one.
                    ramp::step(if share.is_finite() { share } else { 0.0 }) as u8 + 1
                }
                None => NOTHING,
            });
        }
    }
    Picture {
        place: view.frame,
        size,
        indices,
    }
}

struct Field<'a> {
    map: &'a PlanMap,
    holes: Vec<PlanShape>,
}

impl Field<'_> {
    /// The value at a place given as shares of the window, bilinear between cell centres.
    fn at(&self, share: [f64; 2]) -> Option<f64> {
        let size = self.map.size;
        let cell = [0, 1].map(|k| share[k] * size[k] as f64 - 0.5);
        let home = [0, 1].map(|k| (cell[k].round().max(0.0) as usize).min(size[k] - 1));
        let nearest = self.nearest(cell, home)?;
        if self.at_an_edge(home) && !self.same_side(share, nearest) {
            return None;
        }
        let base = cell.map(f64::floor);
        let (mut sum, mut weights) = (0.0, 0.0);
        for [dx, dy] in [[0.0, 0.0], [1.0, 0.0], [0.0, 1.0], [1.0, 1.0]] {
            let corner = [base[0] + dx, base[1] + dy];
            let weight = (1.0 - (cell[0] - corner[0]).abs()) * (1.0 - (cell[1] - corner[1]).abs());
            if let Some(value) = self.value(corner) {
                sum += weight * value;
                weights += weight;
            }
        }
        if weights > 1e-9 {
            Some(sum / weights)
        } else {
            self.value(nearest.map(|k| k as f64))
        }
    }

    fn value(&self, [column, row]: [f64; 2]) -> Option<f64> {
        let [columns, rows] = self.map.size;
        let inside = column >= 0.0 && row >= 0.0 && column < columns as f64 && row < rows as f64;
        let value = *self
            .map
            .values
            .get(inside.then_some(row as usize * columns + column as usize)?)?;
        (!value.is_nan()).then_some(value)
    }

    /// The cell of the place, or the nearest neighbour of it that holds a value.
    fn nearest(&self, cell: [f64; 2], home: [usize; 2]) -> Option<[usize; 2]> {
        let distance = |c: [f64; 2]| (c[0] - cell[0]).hypot(c[1] - cell[1]);
        let own = home.map(|k| k as f64);
        if self.value(own).is_some() {
            return Some(home);
        }
        neighbours(own)
            .filter(|c| self.value(*c).is_some())
            .min_by(|a, b| distance(*a).total_cmp(&distance(*b)))
            .map(|c| c.map(|k| k as usize))
    }

    fn at_an_edge(&self, home: [usize; 2]) -> bool {
        let own = home.map(|k| k as f64);
        self.value(own).is_none() || neighbours(own).any(|c| self.value(c).is_none())
    }

    /// Whether a place and the centre of a cell lie on the same side of every edge.
    ///
    /// Cells know only whether their centre holds a value; the drawn edges cut them to shape.
    fn same_side(&self, share: [f64; 2], cell: [usize; 2]) -> bool {
        let [left, low, right, up] = self.map.window;
        let place = |u: f64, v: f64| [left + u * (right - left), low + v * (up - low)];
        let size = self.map.size.map(|k| k as f64);
        let here = place(share[0], share[1]);
        let centre = place(
            (cell[0] as f64 + 0.5) / size[0],
            (cell[1] as f64 + 0.5) / size[1],
        );
        self.map
            .outlines
            .iter()
            .map(|outline| &outline.shape)
            .chain(&self.holes)
            .all(|shape| shape.covers(here) == shape.covers(centre))
    }
}

fn neighbours([column, row]: [f64; 2]) -> impl Iterator<Item = [f64; 2]> {
    (0..9)
        .filter(|k| *k != 4)
        .map(move |k| [column + f64::from(k % 3 - 1), row + f64::from(k / 3 - 1)])
}
