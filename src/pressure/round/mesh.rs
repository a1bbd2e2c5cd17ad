//! Grid lines of the two plates: dense where pressure or its slope is singular.

use crate::{
    numerics::grading::{Mark, graded},
    pressure::round::{FaceFriction, HeadModel, Problem},
};

/// Lines common to both plates, and lines through each of them.
#[derive(Clone, Debug)]
pub(super) struct Mesh {
    /// Radii of the lines, rising from hole to rim.
    pub radii: Vec<f64>,
    /// Heights of the lines of each plate, rising from the interface to the head.
    pub heights: [Vec<f64>; 2],
    /// Index of the line at the edge of the head.
    pub bearing: usize,
    /// Index of the line at the expected contact edge; the last line where contact reaches the rim.
    pub edge: usize,
}

/// Growth of the spacing from line to line.
const GROWTH: f64 = 1.3;
const GROWTH_THROUGH: f64 = 1.6;
/// Spacings at fineness 1, in units of the bearing radius, found by refining until the public
/// reference solutions were met with room to spare.
const AT_HOLE: f64 = 0.04;
const AT_HEAD: f64 = 0.02;
/// A rigid head's pressure is singular at its edge, the pressure of stuck faces at the hole.
const AT_STUCK_EDGE: f64 = 0.0015;
const AT_STUCK_HOLE: f64 = 0.003;
const AT_RIGID_HEAD: f64 = 0.005;
const UNDER_RIGID_HEAD: f64 = 0.01;
const AT_EDGE: f64 = 0.003;
const IN_CONTACT: f64 = 0.08;
const AT_INTERFACE: f64 = 0.015;
const AT_OUTSIDE: f64 = 0.1;
/// Widest spacing beyond the contact, in units of the radius of the rim.
const BEYOND: f64 = 0.15;
/// Widest spacing through a plate, in units of its thickness.
const THROUGH: f64 = 0.34;

impl Mesh {
    /// The grid for a problem of bearing radius 1, with a line at `edge`; `coarseness` scales all
    /// spacings.
    pub fn new(problem: &Problem, edge: f64, coarseness: f64) -> Self {
        let [a, rim] = [problem.hole_radius, problem.rim_radius];
        // Where all lengths shrink with the plates or the head's width, so do the spacings.
        let thinnest = problem.thickness[0].min(problem.thickness[1]);
        let size = coarseness * thinnest.min(1.0).sqrt();
        let beyond = BEYOND * rim;
        let mark = |at: f64, spacing: f64| Mark {
            at,
            spacing: spacing * size,
        };
        let (at_hole, at_edge) = match problem.faces {
            FaceFriction::Frictionless => (AT_HOLE, AT_EDGE),
            FaceFriction::Stuck => (AT_STUCK_HOLE, AT_STUCK_EDGE),
        };
        let (at_head, outside) = match problem.head {
            HeadModel::Uniform => (AT_HEAD, AT_OUTSIDE),
            HeadModel::Rigid => (AT_RIGID_HEAD, UNDER_RIGID_HEAD),
        };
        let mut marks = vec![mark(a, at_hole), mark(1.0, at_head)];
        let inside = edge < rim;
        if inside {
            marks.push(mark(edge, at_edge));
        }
        if rim > 1.0 {
            marks.push(mark(rim, beyond / size * coarseness));
        }
        marks.sort_by(|one, other| one.at.total_cmp(&other.at));
        let mut radii = vec![a];
        for pair in marks.windows(2) {
            let contact = pair[1].at <= edge.max(1.0);
            let widest = if contact {
                IN_CONTACT * size * pair[1].at.max(1.0)
            } else {
                beyond * coarseness
            };
            let lines = graded([pair[0], pair[1]], GROWTH, widest);
            radii.extend(&lines[1..]);
        }
        let line_at = |radius: f64| radii.partition_point(|line| *line < radius);
        let heights = problem.thickness.map(|thickness| {
            let marks = [mark(0.0, AT_INTERFACE), mark(thickness, outside)];
            graded(
                marks,
                GROWTH_THROUGH,
                THROUGH * thickness * coarseness.min(1.0),
            )
        });
        Self {
            bearing: line_at(1.0),
            edge: if inside {
                line_at(edge)
            } else {
                radii.len() - 1
            },
            radii,
            heights,
        }
    }
}
