//! One annular plate, condensed to the face that meets the other plate.

use nalgebra::DMatrix;

use crate::{
    numerics::{
        banded::{BandedMatrix, NotPositiveDefinite},
        bordered::{Bordered, Column},
        elements::{NODES, Ring, edge_points},
    },
    resistance::round::{Disc, mesh::Mesh},
};

/// What is given on one plate beside the interface.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Given {
    /// Where the temperature is held at the plate's own zero.
    pub held: Held,
    /// Film on the outer face to the plate's own zero, W/(m² K).
    pub film: f64,
    /// Heat entering between two radii of the outer face, W; 0 for none.
    pub heat: f64,
    /// Radii of the part of the outer face where heat or a temperature is given.
    pub patch: [f64; 2],
    /// Radii of the annulus under the head.
    pub head: [f64; 2],
}

/// Where a plate is held at one temperature.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Held {
    /// Nowhere.
    Nowhere,
    /// On the patch of the outer face.
    Patch,
    /// At the rim.
    Rim,
}

/// Where a node stands in the condensed plate.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Place {
    Inside(usize),
    Border(usize),
    Held,
}

/// A functional of nodal temperatures.
type Weights = Vec<(usize, f64)>;

/// One plate: temperatures are level + θ, θ the nodal unknowns, the level that of the whole plate.
///
/// A plate that nothing holds may stand far above the other; with its level apart, rounding of the
/// level never passes for heat. The border holds θ on the shared face, the level, the given heat
/// and one watt under the head, in this order.
#[derive(Clone, Debug)]
pub(super) struct Plate {
    places: Vec<Place>,
    condensed: Bordered,
    /// Whether something holds the temperature.
    pub anchored: bool,
    /// Nodes on the shared face, rising in radius.
    pub shared: Vec<usize>,
    /// Nodes on the outer face, rising in radius.
    pub outer: Vec<usize>,
    /// Nodes on the inner face, rising in radius.
    pub foot: Vec<usize>,
    /// Radius and height of every node.
    pub at: Vec<[f64; 2]>,
    /// Heat given on the outer face, W.
    pub heat: f64,
    /// Share of the annulus under the head where the temperature is held.
    pub head_held: f64,
    /// Heat that enters at the held nodes, by the temperature of every other node.
    pub reaction: Weights,
    /// Mean over the patch of the outer face; over the whole face where no patch is given.
    pub patch_mean: Weights,
    /// Mean over the outer face.
    pub face_mean: Weights,
    /// Area of the outer face.
    pub area: f64,
    /// Mean over the volume.
    pub volume_mean: Vec<f64>,
}

/// Numbering of the nodes column by column.
#[derive(Clone, Copy)]
struct Nodes {
    steps: usize,
    columns: usize,
}

impl Nodes {
    fn stride(self) -> usize {
        3 * self.steps + 2
    }

    fn count(self) -> usize {
        self.columns * self.stride() + 2 * self.steps + 1
    }

    /// Node on a line between columns, by half steps of height.
    fn line(self, line: usize, half: usize) -> usize {
        line * self.stride() + half
    }

    /// Node in the middle of a column.
    fn middle(self, column: usize, step: usize) -> usize {
        column * self.stride() + 2 * self.steps + 1 + step
    }

    /// Nodes of an element in its own order.
    fn element(self, column: usize, step: usize) -> [usize; NODES] {
        let [left, right] = [column, column + 1].map(|line| self.line(line, 2 * step));
        let middle = self.middle(column, step);
        [
            left,
            left + 1,
            left + 2,
            middle,
            middle + 1,
            right,
            right + 1,
            right + 2,
        ]
    }

    /// Nodes of one face over some lines, rising in radius.
    fn face(self, lines: std::ops::Range<usize>, step: usize) -> Vec<usize> {
        let mut nodes = Vec::with_capacity(2 * lines.len());
        for line in lines.clone() {
            nodes.push(self.line(line, 2 * step));
            if line + 1 < lines.end {
                nodes.push(self.middle(line, step));
            }
        }
        nodes
    }
}

impl Plate {
    /// Assembles and condenses a plate.
    pub(super) fn new(
        (mesh, index): (&Mesh, usize),
        disc: &Disc,
        given: &Given,
    ) -> Result<Self, NotPositiveDefinite> {
        let own = mesh.lines[index].clone();
        let heights = &mesh.heights[index];
        let nodes = Nodes {
            steps: heights.len() - 1,
            columns: own.len() - 1,
        };
        let radii = &mesh.radii[own.clone()];
        let shared_lines = mesh.overlap.start - own.start..mesh.overlap.end - own.start;
        let mut plate = Self {
            places: Vec::new(),
            condensed: Bordered::new(BandedMatrix::new(0, 0), &[], DMatrix::zeros(0, 0))?,
            anchored: given.held != Held::Nowhere,
            shared: nodes.face(shared_lines, 0),
            outer: nodes.face(0..own.len(), nodes.steps),
            foot: nodes.face(0..own.len(), 0),
            at: positions(nodes, radii, heights),
            heat: given.heat,
            head_held: 0.0,
            reaction: Vec::new(),
            patch_mean: Vec::new(),
            face_mean: Vec::new(),
            area: 0.0,
            volume_mean: vec![0.0; nodes.count()],
        };
        let face = [radii[0], radii[own.len() - 1]];
        plate.face_mean = plate.outer_weights(radii, face);
        plate.area = normalise(&mut plate.face_mean);
        plate.patch_mean = plate.outer_weights(radii, given.patch);
        normalise(&mut plate.patch_mean);
        let inside = plate.place(nodes, given);
        plate.condense((nodes, radii, heights), disc, (given, inside))?;
        Ok(plate)
    }

    /// ∫ φ 2πr dr on the outer face between two radii that are lines.
    fn outer_weights(&self, radii: &[f64], [low, high]: [f64; 2]) -> Weights {
        let mut weights = Weights::new();
        for (column, pair) in radii.windows(2).enumerate() {
            let middle = 0.5 * (pair[0] + pair[1]);
            if !(low < middle && middle < high) {
                continue;
            }
            for point in edge_points([pair[0], pair[1]]) {
                for (node, shape) in self.outer[2 * column..].iter().zip(point.shapes) {
                    weights.push((*node, point.area * shape));
                }
            }
        }
        weights
    }

    /// Gives every node its place; the number of unknowns inside.
    fn place(&mut self, nodes: Nodes, given: &Given) -> usize {
        const FREE: Place = Place::Inside(0);
        let mut places = vec![FREE; nodes.count()];
        for (border, node) in self.shared.iter().enumerate() {
            places[*node] = Place::Border(border);
        }
        match given.held {
            Held::Nowhere => {}
            Held::Patch => {
                for (node, _) in &self.patch_mean {
                    places[*node] = Place::Held;
                }
            }
            Held::Rim => {
                for half in 0..=2 * nodes.steps {
                    places[nodes.line(nodes.columns, half)] = Place::Held;
                }
            }
        }
        let mut inside = 0;
        for place in &mut places {
            if *place == FREE {
                *place = Place::Inside(inside);
                inside += 1;
            }
        }
        self.places = places;
        inside
    }

    fn condense(
        &mut self,
        (nodes, radii, heights): (Nodes, &[f64], &[f64]),
        disc: &Disc,
        (given, inside): (&Given, usize),
    ) -> Result<(), NotPositiveDefinite> {
        let level = self.level();
        let mut matrix = BandedMatrix::new(inside, nodes.stride() + 2);
        let mut border: Vec<Column> = vec![Vec::new(); level + 3];
        let mut corner = DMatrix::zeros(level + 3, level + 3);
        let mut volume = 0.0;
        for column in 0..nodes.columns {
            for step in 0..nodes.steps {
                let ring = Ring {
                    radii: [radii[column], radii[column + 1]],
                    heights: [heights[step], heights[step + 1]],
                };
                let conduction = ring.conduction(disc.conductivity);
                let element = nodes.element(column, step);
                for (node, share) in element.iter().zip(ring.volumes()) {
                    self.volume_mean[*node] += share;
                    volume += share;
                }
                for (i, one) in element.iter().enumerate() {
                    for (j, other) in element.iter().enumerate().take(i + 1) {
                        let value = conduction[i][j];
                        match (self.places[*one], self.places[*other]) {
                            (Place::Inside(a), Place::Inside(b)) => matrix.add(a, b, value),
                            (Place::Inside(row), Place::Border(b))
                            | (Place::Border(b), Place::Inside(row)) => {
                                border[b].push((row, value));
                            }
                            (Place::Border(a), Place::Border(b)) => {
                                corner[(a, b)] += value;
                                if a != b {
                                    corner[(b, a)] += value;
                                }
                            }
                            (Place::Held, Place::Held) => {}
                            (Place::Held, _) => self.reaction.push((*other, value)),
                            (_, Place::Held) => self.reaction.push((*one, value)),
                        }
                    }
                }
            }
        }
        for weight in &mut self.volume_mean {
            *weight /= volume;
        }
        self.add_film(
            (nodes, radii),
            given.film,
            (&mut matrix, &mut border[level]),
        );
        // The level drives heat only through the film.
        if !self.anchored {
            corner[(level, level)] = given.film * self.area;
            corner[(level, level + 1)] = given.heat;
            corner[(level + 1, level)] = given.heat;
            corner[(level, level + 2)] = 1.0;
            corner[(level + 2, level)] = 1.0;
        }
        let mut head = self.outer_weights(radii, given.head);
        normalise(&mut head);
        let held = |(node, _): &&(usize, f64)| self.places[*node] == Place::Held;
        self.head_held = head.iter().filter(held).map(|(_, weight)| weight).sum();
        let heat = self
            .patch_mean
            .iter()
            .map(|(node, w)| (*node, w * given.heat));
        border[level + 1] = self.inside_rows(heat);
        border[level + 2] = self.inside_rows(head.into_iter());
        self.condensed = Bordered::new(matrix, &border, corner)?;
        if !self.anchored {
            level_rows(&mut self.condensed.reduced, level);
        }
        Ok(())
    }

    fn add_film(
        &self,
        (nodes, radii): (Nodes, &[f64]),
        film: f64,
        (matrix, level): (&mut BandedMatrix, &mut Column),
    ) {
        if film <= 0.0 {
            return;
        }
        for column in 0..nodes.columns {
            let rows = [0, 1, 2].map(|node| self.places[self.outer[2 * column + node]]);
            for point in edge_points([radii[column], radii[column + 1]]) {
                for (i, one) in rows.iter().enumerate() {
                    let Place::Inside(a) = *one else { continue };
                    level.push((a, film * point.area * point.shapes[i]));
                    for (j, other) in rows.iter().enumerate().take(i + 1) {
                        if let Place::Inside(b) = *other {
                            let product = point.shapes[i] * point.shapes[j];
                            matrix.add(a, b, film * point.area * product);
                        }
                    }
                }
            }
        }
    }

    fn inside_rows(&self, weights: impl Iterator<Item = (usize, f64)>) -> Column {
        weights
            .filter_map(|(node, weight)| match self.places[node] {
                Place::Inside(row) => Some((row, weight)),
                Place::Border(_) | Place::Held => None,
            })
            .collect()
    }

    /// Place of the level in the border; the given heat and the watt under the head follow.
    pub(super) fn level(&self) -> usize {
        self.shared.len()
    }

    /// Conductances between θ on the shared face and the level, then the loads on them.
    pub(super) fn reduced(&self) -> &DMatrix<f64> {
        &self.condensed.reduced
    }

    /// Whether a node of the shared face is held.
    pub(super) fn is_held(&self, shared: usize) -> bool {
        self.places[self.shared[shared]] == Place::Held
    }

    /// θ of all nodes from θ on the shared face, the level and the watts under the head.
    pub(super) fn theta(&self, shared: &[f64], [level, under_head]: [f64; 2]) -> Vec<f64> {
        let mut amplitudes: Vec<f64> = shared.iter().map(|value| -value).collect();
        amplitudes.extend([-level, 1.0, under_head]);
        let inside = self.condensed.inside(&amplitudes);
        self.places
            .iter()
            .map(|place| match place {
                Place::Inside(row) => inside[*row],
                Place::Border(border) => shared[*border],
                Place::Held => 0.0,
            })
            .collect()
    }

    /// Unknown temperatures of the plate.
    pub(super) fn unknowns(&self) -> usize {
        self.condensed.order() + self.shared.len()
    }
}

/// Takes out what rounding lets a raised level drive between the shared nodes of a loose plate: the
/// rows of the conductances add up to the column of the level.
fn level_rows(reduced: &mut DMatrix<f64>, level: usize) {
    for row in 0..level {
        let sum: f64 = (0..level).map(|column| reduced[(row, column)]).sum();
        reduced[(row, row)] -= sum - reduced[(row, level)];
    }
}

/// The weighted sum of nodal values.
pub(super) fn weighted(weights: &[(usize, f64)], values: &[f64]) -> f64 {
    weights
        .iter()
        .map(|(node, weight)| weight * values[*node])
        .sum()
}

/// Brings weights to the sum one and tells what it was.
fn normalise(weights: &mut Weights) -> f64 {
    let sum: f64 = weights.iter().map(|(_, weight)| weight).sum();
    for (_, weight) in weights {
        *weight /= sum;
    }
    sum
}

fn positions(nodes: Nodes, radii: &[f64], heights: &[f64]) -> Vec<[f64; 2]> {
    let mut at = Vec::with_capacity(nodes.count());
    for (line, radius) in radii.iter().enumerate() {
        for half in 0..=2 * nodes.steps {
            let height = 0.5 * (heights[half / 2] + heights[half.div_ceil(2)]);
            at.push([*radius, height]);
        }
        if line < nodes.columns {
            let middle = 0.5 * (radius + radii[line + 1]);
            at.extend(heights.iter().map(|height| [middle, *height]));
        }
    }
    at
}
