//! The grid that mechanics and heat share: lines, covers, layers, faying areas.

use crate::{
    numerics::columns::{Disc, Mirror, Plan, Region},
    pressure::elastic::{Body, Failure, Problem, resolution},
};

/// Lines in the plan, layers through every body, and where faces meet.
#[derive(Clone, Debug, PartialEq)]
pub struct Mesh {
    /// Grid lines.
    pub plan: Plan,
    /// Bodies, upper first.
    pub bodies: Vec<MeshBody>,
    /// Interfaces, upper first.
    pub faces: Vec<MeshFace>,
}

/// A body on the grid; nodes through it count upwards from its lowest face.
#[derive(Clone, Debug, PartialEq)]
pub struct MeshBody {
    /// Layers, upper first.
    pub layers: Vec<MeshLayer>,
    /// Index of the plate itself.
    pub main: usize,
    /// Number of nodes through the body.
    pub nodes: usize,
}

/// A layer on the grid.
#[derive(Clone, Debug, PartialEq)]
pub struct MeshLayer {
    /// Where it is, holes taken out.
    pub region: Region,
    /// Share of every cell that it fills, 1.
    pub shares: Vec<f64>,
    /// The part of it that is of another material.
    pub inlay: Option<Region>,
    /// Heights of its elements, upwards, m.
    pub heights: Vec<f64>,
    /// Degree of the elements.
    pub degree: usize,
    /// Its lowest node.
    pub first_node: usize,
}

/// Two faces on the grid.
#[derive(Clone, Debug, PartialEq)]
pub struct MeshFace {
    /// Where both are solid and may touch, holes and everything beside feet taken out.
    pub contact: Region,
    /// Where the plates overlap beside feet.
    pub beside: Region,
    /// Faying area of every column, m².
    pub weight: Vec<f64>,
    /// Area of every column over all cells that the faying area reaches into, m².
    pub full_weight: Vec<f64>,
    /// Area of every column beside feet, m².
    pub open_weight: Vec<f64>,
    /// Mean height of the feet there, m; 0 where there is no such area.
    pub open_height: Vec<f64>,
}

impl MeshLayer {
    /// Its highest node.
    pub fn last_node(&self) -> usize {
        self.first_node + self.heights.len() * self.degree
    }

    fn part(&self, mirror: &Mirror) -> Self {
        let region = self.region.part(mirror);
        Self {
            shares: region.shares(),
            region,
            inlay: self.inlay.as_ref().map(|inlay| inlay.part(mirror)),
            heights: self.heights.clone(),
            ..*self
        }
    }
}

impl MeshBody {
    /// The plate itself.
    pub fn main_layer(&self) -> &MeshLayer {
        &self.layers[self.main]
    }
}

impl Mesh {
    /// Samples covers and holes of a problem on its lines.
    pub(super) fn new(problem: &Problem, plan: Plan) -> Result<Self, Failure> {
        let bodies: Vec<MeshBody> = (0..problem.bodies.len())
            .map(|body| mesh_body(problem, &plan, body))
            .collect();
        let faces: Vec<MeshFace> = (0..problem.interfaces.len())
            .map(|upper| {
                let pair = [upper, upper + 1];
                mesh_face(
                    &plan,
                    pair.map(|body| &problem.bodies[body]),
                    pair.map(|body| &bodies[body]),
                )
            })
            .collect();
        for (interface, face) in faces.iter().enumerate() {
            if face.contact.is_empty() {
                return Err(Failure::NoContact { interface });
            }
        }
        Ok(Self {
            plan,
            bodies,
            faces,
        })
    }

    /// The part of it that stands for the whole.
    pub(super) fn part(&self, mirror: &Mirror) -> Self {
        let plan = mirror.part().clone();
        let bodies = self.bodies.iter().map(|body| MeshBody {
            layers: body.layers.iter().map(|layer| layer.part(mirror)).collect(),
            ..*body
        });
        let faces = self.faces.iter().map(|face| {
            let (contact, beside) = (face.contact.part(mirror), face.beside.part(mirror));
            MeshFace {
                weight: contact.weights(&plan),
                full_weight: contact.full_weights(&plan),
                open_weight: beside.weights(&plan),
                open_height: mirror.kept(&face.open_height),
                contact,
                beside,
            }
        });
        Self {
            bodies: bodies.collect(),
            faces: faces.collect(),
            plan,
        }
    }

    /// The mesh that a problem asks for, without solving anything.
    pub fn of(problem: &Problem) -> Result<Self, Failure> {
        crate::pressure::elastic::size(problem)?;
        Self::new(problem, resolution::plan(problem)?)
    }
}

fn mesh_body(problem: &Problem, plan: &Plan, index: usize) -> MeshBody {
    let body = &problem.bodies[index];
    let holes: Vec<Disc> = problem
        .bolts
        .iter()
        .map(|bolt| Disc {
            centre: bolt.at,
            radius: bolt.hole_radii[index],
        })
        .collect();
    let holes = Region::discs(plan, &holes);
    let mut top = resolution::nodes(problem, index) - 1;
    let layers = body
        .layers
        .iter()
        .map(|layer| {
            let through = resolution::through(problem, layer);
            let region = Region::sample(plan, layer.cover).without(&holes);
            top -= through.elements * through.degree;
            MeshLayer {
                shares: region.shares(),
                inlay: layer
                    .inlay
                    .map(|inlay| Region::sample(plan, inlay.cover).and(&region)),
                region,
                heights: vec![layer.thickness / through.elements as f64; through.elements],
                degree: through.degree,
                first_node: top,
            }
        })
        .collect();
    MeshBody {
        layers,
        main: body.main,
        nodes: resolution::nodes(problem, index),
    }
}

fn mesh_face(plan: &Plan, bodies: [&Body; 2], meshes: [&MeshBody; 2]) -> MeshFace {
    let [upper, lower] = meshes;
    let lowest = &upper.layers[upper.layers.len() - 1].region;
    let topmost = &lower.layers[0].region;
    let contact = lowest.and(topmost);
    let overlap = upper.main_layer().region.and(&lower.main_layer().region);
    let beside = overlap.without(&contact);
    let height = |layers: &[crate::pressure::elastic::Layer]| -> f64 {
        layers.iter().map(|layer| layer.thickness).sum()
    };
    let feet = [
        (height(&bodies[0].layers[bodies[0].main + 1..]), lowest),
        (height(&bodies[1].layers[..bodies[1].main]), topmost),
    ];
    let open_weight = beside.weights(plan);
    let mut open_height = vec![0.0; plan.columns()];
    for (height, foot) in feet {
        let missing = beside.without(foot).weights(plan);
        for ((sum, missing), open) in open_height.iter_mut().zip(missing).zip(&open_weight) {
            if *open > 0.0 {
                *sum += height * missing / open;
            }
        }
    }
    MeshFace {
        weight: contact.weights(plan),
        full_weight: contact.full_weights(plan),
        contact,
        beside,
        open_weight,
        open_height,
    }
}
