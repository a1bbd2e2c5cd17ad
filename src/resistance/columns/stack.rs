//! Stacked bodies of bonded layers on one plan, and where they meet.

use std::collections::BTreeMap;

use crate::{
    numerics::columns::{Plan, Scalar, node_heights, span_loads},
    pressure::elastic::{Mesh, MeshBody},
    resistance::{Failure, columns::Part},
};

/// Conductivity along x, along y and through the thickness, W/(m K).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conductivity {
    /// Along x and along y.
    pub along: [f64; 2],
    /// Through the thickness.
    pub through: f64,
}

impl Conductivity {
    /// The same in all directions.
    pub fn isotropic(conductivity: f64) -> Self {
        Self {
            along: [conductivity; 2],
            through: conductivity,
        }
    }

    /// One value in the plane, one through the thickness.
    pub fn layered(in_plane: f64, through: f64) -> Self {
        Self {
            along: [in_plane; 2],
            through,
        }
    }

    /// Whether it can be computed with.
    pub(super) fn is_sound(self) -> bool {
        let conducts = |k: f64| k.is_finite() && k > 0.0;
        conducts(self.through) && self.along.iter().all(|k| conducts(*k))
    }

    pub(super) fn scalar(self) -> Scalar {
        Scalar {
            along: self.along,
            through: self.through,
        }
    }
}

/// One layer of a body.
#[derive(Clone, Debug, PartialEq)]
pub struct Slab {
    /// Share of every cell of the plan that it fills, 0 to 1, holes taken out.
    pub shares: Vec<f64>,
    /// Heights of its elements, upwards, m.
    pub heights: Vec<f64>,
    /// Degree of the polynomial through each element, 1 to 3.
    pub degree: usize,
}

/// A body: bonded layers, lowest first.
#[derive(Clone, Debug, PartialEq)]
pub struct Body {
    /// The layers; feet below the faying face come first, ribs on the outer face last.
    pub layers: Vec<Slab>,
}

/// Which way a face looks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// Down, towards the sink.
    Down,
    /// Up, towards the source.
    Up,
}

/// Part of an interface: a node of the upper body above a node of the lower one.
#[derive(Clone, Debug, PartialEq)]
pub struct Meeting {
    /// Node of the upper body, counted upwards; 0 where its lowest face touches.
    pub upper: usize,
    /// Node of the lower body, counted upwards.
    pub lower: usize,
    /// Area that belongs to every column, m².
    pub weights: Vec<f64>,
}

impl Meeting {
    /// Where two bodies of a mesh touch, and where they face each other beside feet.
    pub fn of(mesh: &Mesh, interface: usize) -> Vec<Self> {
        let face = &mesh.faces[interface];
        let [upper, lower] = [&mesh.bodies[interface], &mesh.bodies[interface + 1]];
        let mut parts = vec![Self {
            upper: 0,
            lower: lower.nodes - 1,
            weights: face.weight.clone(),
        }];
        if face.open_weight.iter().any(|weight| *weight > 0.0) {
            parts.push(Self {
                upper: upper.main_layer().first_node,
                lower: lower.main_layer().last_node(),
                weights: face.open_weight.clone(),
            });
        }
        parts
    }
}

/// Bodies on one plan, from the warm side down.
#[derive(Clone, Debug, PartialEq)]
pub struct Stack {
    pub(super) plan: Plan,
    pub(super) bodies: Vec<Body>,
    /// For every interface its parts; the first one touches.
    pub(super) faces: Vec<Vec<Meeting>>,
    /// Parts of layers that are not of their body's conductivity, by body and layer.
    pub(super) parts: BTreeMap<(usize, usize), Vec<Part>>,
}

impl Slab {
    /// Nodes above the lowest.
    fn steps(&self) -> usize {
        self.heights.len() * self.degree
    }

    fn thickness(&self) -> f64 {
        self.heights.iter().sum()
    }
}

/// A body of the contact's mesh, whose layers lie the other way about.
impl From<&MeshBody> for Body {
    fn from(body: &MeshBody) -> Self {
        let layers = body.layers.iter().rev().map(|layer| Slab {
            shares: layer.shares.clone(),
            heights: layer.heights.clone(),
            degree: layer.degree,
        });
        Self {
            layers: layers.collect(),
        }
    }
}

impl Body {
    /// Nodes of one column.
    pub fn nodes(&self) -> usize {
        1 + self.layers.iter().map(Slab::steps).sum::<usize>()
    }

    /// Sum of the layers, m.
    pub fn thickness(&self) -> f64 {
        self.layers.iter().map(Slab::thickness).sum()
    }

    /// Heights of the nodes above the lowest, m.
    pub fn heights(&self) -> Vec<f64> {
        let mut nodes = vec![0.0];
        for layer in &self.layers {
            let foot = nodes[nodes.len() - 1];
            let above = node_heights(&layer.heights, layer.degree);
            nodes.extend(above.iter().skip(1).map(|height| foot + height));
        }
        nodes
    }

    /// First node of every layer.
    pub(super) fn first_nodes(&self) -> Vec<usize> {
        let mut first = 0;
        let mut nodes = Vec::with_capacity(self.layers.len());
        for layer in &self.layers {
            nodes.push(first);
            first += layer.steps();
        }
        nodes
    }

    /// Where solid ends towards one side: node and share of every cell, outermost level first.
    ///
    /// What a layer leaves uncovered by the layers beyond it is open; shares nest, as ribs on a plate.
    pub(super) fn open_faces(&self, side: Side) -> Vec<(usize, Vec<f64>)> {
        let first = self.first_nodes();
        let mut order: Vec<usize> = (0..self.layers.len()).collect();
        if side == Side::Up {
            order.reverse();
        }
        let mut covered = vec![0.0_f64; self.layers[0].shares.len()];
        let mut faces = Vec::new();
        for index in order {
            let layer = &self.layers[index];
            let open: Vec<f64> = layer
                .shares
                .iter()
                .zip(&covered)
                .map(|(share, covered)| (share - covered).max(0.0))
                .collect();
            for (covered, share) in covered.iter_mut().zip(&layer.shares) {
                *covered = covered.max(*share);
            }
            if open.iter().any(|share| *share > 0.0) {
                let node = match side {
                    Side::Down => first[index],
                    Side::Up => first[index] + layer.steps(),
                };
                faces.push((node, open));
            }
        }
        faces
    }

    /// Integrals of the polynomials over a span of heights above the lowest node, as (node, integral, layer).
    pub(super) fn span(&self, span: [f64; 2]) -> Vec<(usize, f64, usize)> {
        let mut loads = Vec::new();
        let mut foot = 0.0;
        for (index, (layer, first)) in self.layers.iter().zip(self.first_nodes()).enumerate() {
            let local = [span[0] - foot, span[1] - foot];
            let own = span_loads(&layer.heights, layer.degree, local);
            for (step, load) in own.into_iter().enumerate() {
                loads.push((first + step, load, index));
            }
            foot += layer.thickness();
        }
        loads
    }
}

impl Stack {
    /// Bodies that meet wherever both are, the first above the second and so on.
    ///
    /// The lowest layer of one touches the highest layer of the next; the share of a cell where they
    /// meet is the smaller of their shares. `meeting` says it better where more is known.
    pub fn new(plan: Plan, bodies: Vec<Body>) -> Result<Self, Failure> {
        let misfit = |what: &'static str| Err(Failure::Misfit { what });
        if plan.x.len() < 2 || plan.y.len() < 2 || bodies.is_empty() {
            return misfit("a stack needs cells and bodies");
        }
        for body in &bodies {
            if body.layers.is_empty() {
                return misfit("a body needs a layer");
            }
            for layer in &body.layers {
                let sound = layer.shares.len() == plan.cells()
                    && (1..=3).contains(&layer.degree)
                    && !layer.heights.is_empty()
                    && layer.heights.iter().all(|h| h.is_finite() && *h > 0.0)
                    && layer.shares.iter().all(|s| (0.0..=1.0).contains(s));
                if !sound {
                    return misfit("a layer needs one share for every cell, heights and a degree");
                }
            }
        }
        let faces = bodies
            .windows(2)
            .map(|pair| {
                let above = &pair[0].layers[0].shares;
                let below = &pair[1].layers[pair[1].layers.len() - 1].shares;
                let both: Vec<f64> = above.iter().zip(below).map(|(a, b)| a.min(*b)).collect();
                vec![Meeting {
                    upper: 0,
                    lower: pair[1].nodes() - 1,
                    weights: quarters(&plan, &both),
                }]
            })
            .collect();
        Ok(Self {
            plan,
            bodies,
            faces,
            parts: BTreeMap::new(),
        })
    }

    /// The bodies that carry a contact, on the grid it was solved on.
    ///
    /// An interface has one part, or two where there are feet: the second joins the plates beside
    /// them, across the gap that the field calls open.
    pub fn of(mesh: &Mesh) -> Result<Self, Failure> {
        let bodies = mesh.bodies.iter().map(Body::from).collect();
        let mut stack = Self::new(mesh.plan.clone(), bodies)?;
        for interface in 0..mesh.faces.len() {
            stack = stack.meeting(interface, Meeting::of(mesh, interface))?;
        }
        Ok(stack)
    }

    /// The same bodies with an interface divided otherwise: the touching part first.
    ///
    /// Beside feet another part joins the node above the feet with the face below, across the open gap.
    pub fn meeting(mut self, interface: usize, parts: Vec<Meeting>) -> Result<Self, Failure> {
        let fits = parts.iter().all(|part| {
            part.weights.len() == self.plan.columns()
                && part.weights.iter().all(|w| w.is_finite() && *w >= 0.0)
                && interface + 1 < self.bodies.len()
                && part.upper < self.bodies[interface].nodes()
                && part.lower < self.bodies[interface + 1].nodes()
        });
        if !fits || parts.is_empty() || interface >= self.faces.len() {
            return Err(Failure::Misfit {
                what: "an interface needs nodes of its bodies and an area for every column",
            });
        }
        self.faces[interface] = parts;
        Ok(self)
    }

    /// The plan.
    pub fn plan(&self) -> &Plan {
        &self.plan
    }

    /// The bodies, warm side first.
    pub fn bodies(&self) -> &[Body] {
        &self.bodies
    }

    /// The parts of every interface.
    pub fn faces(&self) -> &[Vec<Meeting>] {
        &self.faces
    }

    /// The same local conductance everywhere, W/(m² K): one value for every column of every part.
    pub fn uniform(&self, conductance: f64) -> Vec<Vec<Vec<f64>>> {
        self.faces
            .iter()
            .map(|parts| vec![vec![conductance; self.plan.columns()]; parts.len()])
            .collect()
    }

    /// Largest share of solid around a column in the layers at a node, over the cells that hold any.
    ///
    /// Columns in a hole, and those that reach solid only with a sliver, have less than a half.
    pub fn solid(&self, body: usize, node: usize) -> Vec<f64> {
        let mut solid = vec![0.0_f64; self.plan.columns()];
        let body = &self.bodies[body];
        for (layer, first) in body.layers.iter().zip(body.first_nodes()) {
            if !(first..=first + layer.steps()).contains(&node) {
                continue;
            }
            let mut held = vec![[0.0; 2]; solid.len()];
            for (cell, share) in layer.shares.iter().enumerate() {
                if *share > 0.0 {
                    let area = self.plan.cell_area(cell);
                    for column in self.plan.corners(cell) {
                        held[column][0] += share * area;
                        held[column][1] += area;
                    }
                }
            }
            for (solid, [part, whole]) in solid.iter_mut().zip(held) {
                if whole > 0.0 {
                    *solid = solid.max(part / whole);
                }
            }
        }
        solid
    }

    /// Volume that belongs to every node of a body, m³: column by column.
    pub(super) fn volumes(&self, body: usize) -> Vec<f64> {
        let body = &self.bodies[body];
        let nodes = body.nodes();
        let mut volumes = vec![0.0; self.plan.columns() * nodes];
        let areas: Vec<Vec<f64>> = body
            .layers
            .iter()
            .map(|layer| quarters(&self.plan, &layer.shares))
            .collect();
        for (node, height, layer) in body.span([0.0, body.thickness()]) {
            for (column, area) in areas[layer].iter().enumerate() {
                volumes[column * nodes + node] += area * height;
            }
        }
        volumes
    }
}

/// A quarter of the filled area of every cell to each of its corners, m².
pub(super) fn quarters(plan: &Plan, shares: &[f64]) -> Vec<f64> {
    let mut weights = vec![0.0; plan.columns()];
    for (cell, share) in shares.iter().enumerate() {
        for column in plan.corners(cell) {
            weights[column] += 0.25 * share * plan.cell_area(cell);
        }
    }
    weights
}
