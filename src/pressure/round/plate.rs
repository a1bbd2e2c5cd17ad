//! One annular plate, reduced to how its faces yield to the pressures on them.

use nalgebra::DMatrix;

use crate::{
    numerics::{
        banded::NotPositiveDefinite,
        condensation::{Chain, Front},
        elements::{Lame, NODES, Ring, edge_load},
    },
    pressure::round::HeadModel,
};

/// A load of unit amplitude on a plate, and with it the mean displacement that it feels.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Load {
    /// Pressure on the interface that falls in straight lines from a grid line to its neighbours.
    Pressure(usize),
    /// Outward shear on the interface, of the same shape.
    Shear(usize),
    /// Pressure of the head, of the same shape, cut off where the head ends.
    Head(usize),
    /// Uniform pressure 1 of the head.
    Uniform,
}

/// A plate of Young's modulus 1 on its grid, standing on the interface at height 0.
#[derive(Clone, Copy, Debug)]
pub(super) struct Plate<'a> {
    /// Radii of the grid lines, rising.
    pub radii: &'a [f64],
    /// Heights of the grid lines, rising from the interface to the head.
    pub heights: &'a [f64],
    /// Poisson's ratio ν, 1.
    pub poisson: f64,
    /// What presses on it.
    pub loaded: Loaded,
}

/// Which loads stand on a plate.
#[derive(Clone, Copy, Debug)]
pub(super) struct Loaded {
    /// How the head presses.
    pub head: HeadModel,
    /// Index of the grid line where the head ends.
    pub bearing: usize,
    /// Number of grid lines, from the hole on, that can carry shear.
    pub sheared: usize,
}

impl Loaded {
    /// The loads in the order in which an elimination from rim to hole meets them.
    pub fn loads(&self, lines: usize) -> Vec<Load> {
        let mut loads = Vec::new();
        for line in (0..lines).rev() {
            loads.push(Load::Pressure(line));
            if line < self.sheared {
                loads.push(Load::Shear(line));
            }
            match self.head {
                HeadModel::Rigid if line <= self.bearing => loads.push(Load::Head(line)),
                HeadModel::Uniform if line == self.bearing => loads.push(Load::Uniform),
                _ => {}
            }
        }
        loads
    }
}

/// Row of every load in the border, by the line at which it peaks.
struct Rows {
    pressure: Vec<usize>,
    shear: Vec<Option<usize>>,
    head: Vec<Option<usize>>,
    uniform: Option<usize>,
}

impl Rows {
    fn of(loads: &[Load], lines: usize) -> Self {
        let mut rows = Self {
            pressure: vec![0; lines],
            shear: vec![None; lines],
            head: vec![None; lines],
            uniform: None,
        };
        for (row, load) in loads.iter().enumerate() {
            match load {
                Load::Pressure(line) => rows.pressure[*line] = row,
                Load::Shear(line) => rows.shear[*line] = Some(row),
                Load::Head(line) => rows.head[*line] = Some(row),
                Load::Uniform => rows.uniform = Some(row),
            }
        }
        rows
    }
}

impl Plate<'_> {
    /// Mean displacement felt by every load under every load, in the order of [`Loaded::loads`].
    ///
    /// The plate is held by one axial unknown; loads in balance do not feel it. Pressure on the
    /// interface lifts the plate and feels its lift; pressure of the head pushes it down.
    pub fn compliance(&self) -> Result<DMatrix<f64>, NotPositiveDefinite> {
        let lines = self.radii.len();
        let loads = self.loaded.loads(lines);
        let rows = Rows::of(&loads, lines);
        let steps = self.heights.len() - 1;
        let chain = Chain {
            links: lines - 1,
            interior: 2 * (steps + 1),
            line: 2 * (2 * steps + 1),
            border: loads.len(),
        };
        let lame = Lame::of_poisson(self.poisson);
        chain.response(|link, front| {
            // Links run from the rim inward.
            let inner = lines - 2 - link;
            self.add_elements(front, inner, lame);
            self.add_loads(front, inner, &rows);
        })
    }

    /// Unknown displacements of the plate.
    pub fn unknowns(&self) -> usize {
        let (columns, steps) = (self.radii.len() - 1, self.heights.len() - 1);
        2 * ((columns + 1) * (2 * steps + 1) + columns * (steps + 1))
    }

    fn add_elements(&self, front: &mut Front, inner: usize, lame: Lame) {
        let held = self.held(front, inner);
        for place in &held {
            front.fix(*place);
        }
        for step in 0..self.heights.len() - 1 {
            let ring = Ring {
                radii: [self.radii[inner], self.radii[inner + 1]],
                heights: [self.heights[step], self.heights[step + 1]],
            };
            let stiffness = ring.stiffness(lame);
            let places = places(front, step);
            for (i, one) in places.iter().enumerate() {
                if held.contains(one) {
                    continue;
                }
                for (j, other) in places.iter().enumerate().take(i + 1) {
                    if !held.contains(other) {
                        front.add(*one, *other, stiffness[i][j]);
                    }
                }
            }
        }
    }

    /// Unknowns held at zero in the innermost link: one axial, and the radial ones on an axis.
    fn held(&self, front: &Front, inner: usize) -> Vec<usize> {
        if inner > 0 {
            return Vec::new();
        }
        let nodes = 2 * self.heights.len() - 1;
        let mut held = vec![front.far(2 * (nodes - 1) + 1)];
        if self.radii[0] == 0.0 {
            held.extend((0..nodes).map(|node| front.far(2 * node)));
        }
        held
    }

    fn add_loads(&self, front: &mut Front, inner: usize, rows: &Rows) {
        let load = edge_load([self.radii[inner], self.radii[inner + 1]]);
        let steps = self.heights.len() - 1;
        let held = self.held(front, inner);
        let (foot, top) = ([0, 0, 0], [2 * steps, steps, 2 * steps]);
        let mut put = |row: usize, nodes: [usize; 3], (axis, values): (usize, [f64; 3])| {
            let places = [
                front.far(2 * nodes[0] + axis),
                front.interior(2 * nodes[1] + axis),
                front.near(2 * nodes[2] + axis),
            ];
            for (place, value) in places.into_iter().zip(values) {
                if !held.contains(&place) {
                    front.add(place, front.border(row), value);
                }
            }
        };
        let down = |values: [f64; 3]| values.map(|value| -value);
        for (side, values) in load.into_iter().enumerate() {
            let line = inner + side;
            put(rows.pressure[line], foot, (1, values));
            if let Some(row) = rows.shear[line] {
                put(row, foot, (0, values));
            }
            if inner < self.loaded.bearing {
                if let Some(row) = rows.head[line] {
                    put(row, top, (1, down(values)));
                }
                if let Some(row) = rows.uniform {
                    put(row, top, (1, down(values)));
                }
            }
        }
    }
}

/// Places of the unknowns of the element at one height, in the element's own order.
fn places(front: &Front, step: usize) -> [usize; 2 * NODES] {
    let mut places = [0; 2 * NODES];
    for axis in 0..2 {
        for height in 0..3 {
            places[2 * height + axis] = front.far(2 * (2 * step + height) + axis);
            places[2 * (5 + height) + axis] = front.near(2 * (2 * step + height) + axis);
        }
        for height in 0..2 {
            places[2 * (3 + height) + axis] = front.interior(2 * (step + height) + axis);
        }
    }
    places
}
