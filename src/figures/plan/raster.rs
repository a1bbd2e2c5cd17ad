//! The field of a plan map as an image, finer than its cells and cut at the true edges.

use crate::figures::{
    axis::Axis,
    picture::{NOTHING, Picture},
    plan::{DetailKind, PlanMap, PlanShape, View},
    ramp,
};

/// Pixels to the point; the final image has as many.
const FINENESS: f64 = 2.0;

/// The image of the field.
pub(super) fn picture(map: &PlanMap, view: &View, colours: &Axis) -> Picture {
    let size = [view.frame.width(), view.frame.height()]
        .map(|length| ((length * FINENESS).round() as usize).max(1));
    let field = Field::new(map);
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
        ramp: map.ramp,
        ground: view.ground,
    }
}

/// What a cell shows; values of different kinds are never mixed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Kind {
    Nothing,
    Zero,
    Value,
}

/// The field with what is needed to cut it.
struct Field<'a> {
    map: &'a PlanMap,
    /// Whether drawn circles part cells of zero from the others; a solved field runs out smoothly.
    parted: bool,
    /// For each cell with a neighbour of another kind, what parts the cells around it.
    borders: Vec<Option<Border>>,
}

/// The edges that part the cells around one cell.
struct Border {
    edges: Vec<PlanShape>,
    /// The cell itself and its neighbours with the side of every edge on which each centre lies.
    cells: Vec<([i64; 2], Vec<bool>)>,
}

impl<'a> Field<'a> {
    fn new(map: &'a PlanMap) -> Self {
        let holes = map.bolts.iter().map(|bolt| (bolt.at, bolt.hole_radius));
        let contacts = map
            .bolts
            .iter()
            .filter_map(|bolt| Some((bolt.at, bolt.contact_radius?)));
        let details = map.details.iter().filter(|d| d.kind != DetailKind::Rib);
        let mut edges: Vec<PlanShape> = map
            .outlines
            .iter()
            .map(|outline| outline.shape.clone())
            .chain(details.map(|detail| detail.shape.clone()))
            .collect();
        edges.extend(
            holes
                .chain(contacts)
                .map(|(centre, radius)| PlanShape::Disc { centre, radius }),
        );
        let mut field = Self {
            map,
            parted: map.bolts.iter().any(|bolt| bolt.contact_radius.is_some()),
            borders: Vec::new(),
        };
        let [columns, rows] = map.size.map(|k| k as i64);
        field.borders = (0..rows)
            .flat_map(|row| (0..columns).map(move |column| [column, row]))
            .map(|cell| field.border(cell, &edges))
            .collect();
        field
    }

    fn border(&self, home: [i64; 2], edges: &[PlanShape]) -> Option<Border> {
        let kind = self.kind(home);
        block(home).find(|cell| self.kind(*cell) != kind)?;
        let size = self.map.size.map(|k| k as f64);
        let centre =
            |[x, y]: [i64; 2]| self.place([(x as f64 + 0.5) / size[0], (y as f64 + 0.5) / size[1]]);
        let centres: Vec<[f64; 2]> = block(home).map(centre).collect();
        // An edge that no two centres lie across is finer than the cells and parts nothing.
        let parting: Vec<PlanShape> = edges
            .iter()
            .filter(|edge| {
                let inside = centres.iter().filter(|c| edge.covers(**c)).count();
                inside > 0 && inside < centres.len()
            })
            .cloned()
            .collect();
        let cells = block(home)
            .zip(&centres)
            .map(|(cell, c)| (cell, parting.iter().map(|edge| edge.covers(*c)).collect()))
            .collect();
        Some(Border {
            edges: parting,
            cells,
        })
    }

    /// The value at a place given as shares of the window, bilinear between cells of one kind.
    fn at(&self, share: [f64; 2]) -> Option<f64> {
        let size = self.map.size;
        let cell = [0, 1].map(|k| share[k] * size[k] as f64 - 0.5);
        let home = [0, 1].map(|k| (cell[k].round() as i64).clamp(0, size[k] as i64 - 1));
        let border = self.borders[home[1] as usize * size[0] + home[0] as usize].as_ref();
        let Some(border) = border else {
            return self.smooth(cell, home);
        };
        let source = self.partner(border, (share, cell), home);
        let kind = self.kind(source);
        let own = self.value(source)?;
        let base = cell.map(|c| c.floor() as i64);
        let (mut sum, mut weights) = (0.0, 0.0);
        for [dx, dy] in [[0, 0], [1, 0], [0, 1], [1, 1]] {
            let corner = [base[0] + dx, base[1] + dy];
            let weight = [0, 1].map(|k| 1.0 - (cell[k] - corner[k] as f64).abs());
            if self.kind(corner) == kind {
                sum += weight[0] * weight[1] * self.value(corner).unwrap_or(0.0);
                weights += weight[0] * weight[1];
            }
        }
        Some(if weights > 1e-9 { sum / weights } else { own })
    }

    /// The value inside a region of one kind, where all four cells around a place have one.
    fn smooth(&self, cell: [f64; 2], home: [i64; 2]) -> Option<f64> {
        if self.kind(home) != Kind::Value {
            return self.value(home);
        }
        let [left, low] = cell.map(f64::floor);
        let (u, v) = (cell[0] - left, cell[1] - low);
        let at = low as usize * self.map.size[0] + left as usize;
        let lower = self.map.values.get(at..at + 2)?;
        let upper = self.map.values.get(at + self.map.size[0]..)?;
        let across = |row: &[f64]| row[0] + u * (row[1] - row[0]);
        Some(across(lower) + v * (across(upper.get(..2)?) - across(lower)))
    }

    /// The nearest cell whose centre lies on the same side of every parting edge as the place.
    ///
    /// A cell knows only what its centre is; the drawn edges cut the cells to shape.
    fn partner(
        &self,
        border: &Border,
        (share, cell): ([f64; 2], [f64; 2]),
        home: [i64; 2],
    ) -> [i64; 2] {
        let here = self.place(share);
        let sides: Vec<bool> = border.edges.iter().map(|edge| edge.covers(here)).collect();
        let distance = |c: &[i64; 2]| (c[0] as f64 - cell[0]).hypot(c[1] as f64 - cell[1]);
        border
            .cells
            .iter()
            .filter(|(_, own)| *own == sides)
            .map(|(cell, _)| *cell)
            .min_by(|a, b| distance(a).total_cmp(&distance(b)))
            .unwrap_or(home)
    }

    fn value(&self, [column, row]: [i64; 2]) -> Option<f64> {
        let [columns, rows] = self.map.size.map(|k| k as i64);
        let inside = (0..columns).contains(&column) && (0..rows).contains(&row);
        let at = inside.then_some((row * columns + column) as usize)?;
        self.map.values.get(at).copied().filter(|v| !v.is_nan())
    }

    fn kind(&self, cell: [i64; 2]) -> Kind {
        match self.value(cell) {
            None => Kind::Nothing,
            Some(0.0) if self.parted => Kind::Zero,
            Some(_) => Kind::Value,
        }
    }

    fn place(&self, share: [f64; 2]) -> [f64; 2] {
        let [left, low, right, up] = self.map.window;
        [
            left + share[0] * (right - left),
            low + share[1] * (up - low),
        ]
    }
}

/// A cell and its eight neighbours.
fn block([column, row]: [i64; 2]) -> impl Iterator<Item = [i64; 2]> {
    (0..9).map(move |k| [column + k % 3 - 1, row + k / 3 - 1])
}
