//! Temperatures and flux on columns, read from the solved heat.

use crate::{
    estimate::{FacePoint, Temperatures},
    numerics::columns::Region,
    pressure::elastic::MeshFace,
    resistance::columns::{Across, Heat, Meeting, Section},
};

/// Columns with less solid around them say nothing about the plate.
const MOSTLY: f64 = 0.5;

pub(super) fn at_a_glance(heat: &Heat) -> Temperatures {
    Temperatures {
        hottest: heat.hottest.rise,
        hottest_at: heat.hottest.at,
        // The chain knows them.
        names: Vec::new(),
        plate_means: heat.body_means.clone(),
        interface_drops: heat.interface_drops.clone(),
    }
}

/// One part of an interface as drawings read it.
struct Part<'a> {
    region: &'a Region,
    meeting: &'a Meeting,
    /// Flux down, 1/m².
    flux: &'a [f64],
    /// Solid around every column of the warm and of the cold face.
    solid: [Vec<f64>; 2],
}

/// An interface at points; beside feet the plates themselves.
pub(super) fn face_points(
    (shape, heat): (&MeshFace, &Heat),
    points: &[[f64; 2]],
    interface: usize,
) -> Vec<Option<FacePoint>> {
    let stack = heat.stack();
    let plan = stack.plan();
    // The bodies that meet there, warm one first.
    let bodies = [interface, interface + 1];
    let parts: Vec<Part> = stack.faces()[interface]
        .iter()
        .zip(&heat.flux[interface])
        .zip([&shape.contact, &shape.beside])
        .map(|((meeting, flux), region)| Part {
            region,
            meeting,
            flux,
            solid: [
                stack.solid(bodies[0], meeting.upper),
                stack.solid(bodies[1], meeting.lower),
            ],
        })
        .collect();
    let (mut crossing, mut area) = (0.0, 0.0);
    for part in &parts {
        for (flux, weight) in part.flux.iter().zip(&part.meeting.weights) {
            crossing += flux * weight;
            area += weight;
        }
    }
    let mean = crossing / area;
    let nodes = bodies.map(|body| stack.bodies()[body].nodes());
    points
        .iter()
        .map(|point| {
            let part = parts.iter().find(|part| part.region.holds(plan, *point))?;
            let around = plan.around(*point)?;
            // Columns in holes carry no meaning; those around them stand in for them.
            let over = |counts: &dyn Fn(usize) -> bool, value: &dyn Fn(usize) -> f64| {
                let mut sums = [0.0; 2];
                for (column, weight) in around.into_iter().filter(|(column, _)| counts(*column)) {
                    sums[0] += weight * value(column);
                    sums[1] += weight;
                }
                (sums[1] > 0.0).then(|| sums[0] / sums[1])
            };
            let face = |side: usize, node: usize| {
                over(&|column| part.solid[side][column] >= MOSTLY, &|column| {
                    heat.temperatures[bodies[side]][column * nodes[side] + node] - heat.sink_mean
                })
            };
            let weights = &part.meeting.weights;
            let flux = over(&|column| weights[column] > 0.0, &|column| part.flux[column])?;
            Some(FacePoint {
                rises: [face(0, part.meeting.upper)?, face(1, part.meeting.lower)?],
                flux,
                concentration: flux / mean,
            })
        })
        .collect()
}

/// A section above the mean sink surface.
pub(super) fn section(heat: &Heat, across: Across) -> Option<Vec<Section>> {
    let mut sections = heat.section(across)?;
    for section in &mut sections {
        for rise in section.rise.iter_mut().flatten().flatten() {
            *rise -= heat.sink_mean;
        }
    }
    Some(sections)
}
