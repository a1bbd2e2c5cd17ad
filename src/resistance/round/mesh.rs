//! Grid lines of two round plates for the heat: dense where the flux is singular.

use std::ops::Range;

use crate::{
    numerics::grading::{Mark, graded},
    resistance::round::{Inlet, Outlet, Problem},
};

/// Lines common to both plates, and lines through each of them.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Mesh {
    /// Radii of the lines, rising, from the smaller hole to the larger rim.
    pub radii: Vec<f64>,
    /// Lines that each plate spans.
    pub lines: [Range<usize>; 2],
    /// Lines where both plates are.
    pub overlap: Range<usize>,
    /// Heights of the lines of each plate, rising from the interface to the outer face.
    pub heights: [Vec<f64>; 2],
}

/// How dense a grid is laid.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Density {
    /// For the answer.
    Fine,
    /// For the error of the answer.
    Coarse,
}

/// Growth of the spacing from line to line.
const GROWTH: f64 = 1.5;
const GROWTH_THROUGH: f64 = 1.7;
/// Spacings in units of the thinner plate or of the bearing radius, whichever is less, found by
/// refining until resistances stood still in the fourth digit.
const AT_EDGE: f64 = 0.002;
const AT_SOURCE: f64 = 0.002;
const AT_HEAD: f64 = 0.1;
const AT_HOLE: f64 = 0.15;
const AT_RIM: f64 = 0.25;
/// Between two held rims heat may cross in the last corner.
const AT_HELD_RIM: f64 = 0.03;
/// Spacings through a plate, in units of the lesser of thickness and bearing radius.
const AT_INTERFACE: f64 = 0.004;
const UNDER_SOURCE_EDGE: f64 = 0.003;
const UNDER_HEAD: f64 = 0.1;
/// Widest spacing through a plate, in units of its thickness.
const THROUGH: f64 = 0.3;
/// Widest spacing in the contact, in units of the radius.
const IN_CONTACT: f64 = 0.1;
/// Widest spacing beyond, in units of the radius of the rim.
const BEYOND: f64 = 0.15;
/// Lines nearer than this share of the radius are one.
const ONE: f64 = 1e-9;

impl Mesh {
    pub(super) fn new(problem: &Problem, density: Density) -> Self {
        let (scale, power) = match density {
            Density::Fine => (1.0, 1.0),
            Density::Coarse => (2.0, 2.0),
        };
        let [first, second] = problem.plates;
        let length = problem
            .bearing_radius
            .min(first.thickness)
            .min(second.thickness);
        let rim = first.rim_radius.max(second.rim_radius);
        let hole = first.hole_radius.min(second.hole_radius);
        let at_rim = if problem.inlet == Inlet::Rim || problem.outlet == Outlet::Rim {
            AT_HELD_RIM
        } else {
            AT_RIM
        };
        let mut marks: Vec<Mark> = Vec::new();
        let mut put = |at: f64, spacing: f64| {
            if hole <= at && at <= rim {
                marks.push(Mark {
                    at,
                    spacing: scale * spacing * length,
                });
            }
        };
        for plate in [first, second] {
            put(plate.hole_radius, AT_HOLE);
            put(plate.rim_radius, at_rim);
        }
        put(problem.bearing_radius, AT_HEAD);
        put(problem.contact_radius, AT_EDGE);
        for edge in problem.patch_edges() {
            put(edge, AT_SOURCE);
        }
        let radii = lines(
            marks,
            |middle| {
                scale
                    * if middle < problem.contact_radius {
                        IN_CONTACT * middle.max(problem.bearing_radius)
                    } else {
                        BEYOND * rim
                    }
            },
            GROWTH.powf(power),
        );
        let at = |radius: f64| radii.partition_point(|line| *line < radius * (1.0 - ONE));
        let spanned = |plate: usize| {
            at(problem.plates[plate].hole_radius)..at(problem.plates[plate].rim_radius) + 1
        };
        let lines = [spanned(0), spanned(1)];
        let overlap = lines[0].start.max(lines[1].start)..lines[0].end.min(lines[1].end);
        let heights = [0, 1].map(|plate: usize| {
            let thickness = problem.plates[plate].thickness;
            let length = thickness.min(problem.bearing_radius);
            let outside = if problem.has_edge_on(plate) {
                UNDER_SOURCE_EDGE
            } else if problem.shank > 0.0 {
                UNDER_HEAD
            } else {
                THROUGH
            };
            let marks = [(0.0, AT_INTERFACE), (thickness, outside)].map(|(at, spacing)| Mark {
                at,
                spacing: scale * spacing * length,
            });
            graded(
                marks,
                GROWTH_THROUGH.powf(power),
                THROUGH * thickness * scale,
            )
        });
        Self {
            radii,
            lines,
            overlap,
            heights,
        }
    }

    /// Radii between which both plates have a column.
    pub(super) fn shared(&self) -> impl Iterator<Item = [f64; 2]> + '_ {
        self.radii[self.overlap.clone()]
            .windows(2)
            .map(|pair| [pair[0], pair[1]])
    }
}

/// Lines through all marks; of marks at one place the densest counts.
fn lines(mut marks: Vec<Mark>, widest: impl Fn(f64) -> f64, growth: f64) -> Vec<f64> {
    marks.sort_by(|one, other| one.at.total_cmp(&other.at));
    let mut distinct: Vec<Mark> = Vec::new();
    for mark in marks {
        match distinct.last_mut() {
            Some(last) if mark.at - last.at <= ONE * mark.at => {
                last.spacing = last.spacing.min(mark.spacing);
            }
            _ => distinct.push(mark),
        }
    }
    let mut radii: Vec<f64> = distinct.first().iter().map(|mark| mark.at).collect();
    for pair in distinct.windows(2) {
        let middle = 0.5 * (pair[0].at + pair[1].at);
        radii.extend(&graded([pair[0], pair[1]], growth, widest(middle))[1..]);
    }
    radii
}

impl Problem {
    /// Radii at which heat given on a part of a face begins or ends.
    fn patch_edges(&self) -> Vec<f64> {
        (0..2)
            .filter_map(|plate| Some((plate, self.patch(plate)?)))
            .flat_map(|(plate, patch)| self.edges_inside(plate, patch))
            .collect()
    }

    fn has_edge_on(&self, plate: usize) -> bool {
        self.patch(plate)
            .is_some_and(|patch| !self.edges_inside(plate, patch).is_empty())
    }

    fn edges_inside(&self, plate: usize, patch: [f64; 2]) -> Vec<f64> {
        let disc = self.plates[plate];
        patch
            .into_iter()
            .filter(|edge| disc.hole_radius < *edge && *edge < disc.rim_radius)
            .collect()
    }

    /// Part of the outer face of a plate where heat or a temperature is given.
    pub(super) fn patch(&self, plate: usize) -> Option<[f64; 2]> {
        let patch = match (plate, self.inlet) {
            (0, Inlet::Flux(patch) | Inlet::Isothermal(patch)) => Some(patch),
            (0, Inlet::Rim) => None,
            _ => self.outlet.patch(),
        };
        patch.map(|patch| patch.radii(&self.plates[plate]))
    }
}
