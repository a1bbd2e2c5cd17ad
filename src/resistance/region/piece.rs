//! Parts of a boundary, and the area between them and the axis inside a circle.

use std::f64::consts::{FRAC_PI_2, TAU};

use crate::resistance::region::Arc;

/// A part of the boundary, run through counter-clockwise.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Piece {
    Segment {
        from: [f64; 2],
        to: [f64; 2],
    },
    Arc {
        centre: [f64; 2],
        radius: f64,
        start: f64,
        sweep: f64,
    },
}

/// Arc pieces short enough that none turns by half a turn as seen from the axis.
pub(super) fn split_arc(centre: [f64; 2], radius: f64, arc: Arc) -> Vec<Piece> {
    // Nearest and farthest point seen from the axis, and the two quarters between.
    let nearest = (-centre[1]).atan2(-centre[0]);
    let mut stops: Vec<f64> = (0..4)
        .map(|quarter| (nearest + f64::from(quarter) * FRAC_PI_2 - arc.start).rem_euclid(TAU))
        .filter(|stop| *stop < arc.sweep)
        .collect();
    stops.extend([0.0, arc.sweep]);
    stops.sort_by(f64::total_cmp);
    stops
        .windows(2)
        .map(|pair| Piece::Arc {
            centre,
            radius,
            start: arc.start + pair[0],
            sweep: pair[1] - pair[0],
        })
        .collect()
}

/// Half the square of the radius times the angle between two points seen from the axis.
fn sector(radius: f64, from: [f64; 2], to: [f64; 2]) -> f64 {
    0.5 * radius * radius * cross(from, to).atan2(dot(from, to))
}

impl Piece {
    /// Signed area between the axis and the piece, inside a circle about the axis.
    pub(super) fn area_within(&self, circle: f64) -> f64 {
        match *self {
            Self::Segment { from, to } => {
                let step = minus(to, from);
                let (length, half) = (dot(step, step), dot(from, step));
                let root = half * half - length * (dot(from, from) - circle * circle);
                let mut stops = vec![0.0];
                if root > 0.0 && circle.is_finite() {
                    stops.extend(
                        [
                            (-half - root.sqrt()) / length,
                            (-half + root.sqrt()) / length,
                        ]
                        .into_iter()
                        .filter(|stop| *stop > 0.0 && *stop < 1.0),
                    );
                }
                stops.push(1.0);
                sum_between(
                    &stops,
                    circle,
                    |stop| along(from, step, stop),
                    |a, b| 0.5 * cross(along(from, step, a), along(from, step, b)),
                )
            }
            Self::Arc {
                centre,
                radius,
                start,
                sweep,
            } => {
                let mut stops = vec![start];
                let distance = dot(centre, centre).sqrt();
                let cosine = (circle * circle - distance * distance - radius * radius)
                    / (2.0 * distance * radius);
                if cosine.abs() < 1.0 {
                    let direction = centre[1].atan2(centre[0]);
                    let mut crossings: Vec<f64> = [-1.0, 1.0]
                        .map(|sign| (direction + sign * cosine.acos() - start).rem_euclid(TAU))
                        .into_iter()
                        .filter(|stop| *stop > 0.0 && *stop < sweep)
                        .collect();
                    crossings.sort_by(f64::total_cmp);
                    stops.extend(crossings.iter().map(|stop| start + stop));
                }
                stops.push(start + sweep);
                let point = |angle: f64| polar(centre, radius, angle);
                sum_between(&stops, circle, point, |a, b| {
                    let chord = minus(polar([0.0; 2], 1.0, b), polar([0.0; 2], 1.0, a));
                    0.5 * radius * (radius * (b - a) + cross(centre, chord))
                })
            }
        }
    }
}

/// Sum over the parts between stops: the area under the piece inside the circle, a sector outside.
fn sum_between(
    stops: &[f64],
    circle: f64,
    point: impl Fn(f64) -> [f64; 2],
    inside: impl Fn(f64, f64) -> f64,
) -> f64 {
    stops
        .windows(2)
        .map(|pair| {
            let middle = point(0.5 * (pair[0] + pair[1]));
            if dot(middle, middle) <= circle * circle {
                inside(pair[0], pair[1])
            } else {
                sector(circle, point(pair[0]), point(pair[1]))
            }
        })
        .sum()
}

pub(super) fn dot(a: [f64; 2], b: [f64; 2]) -> f64 {
    a[0] * b[0] + a[1] * b[1]
}

pub(super) fn cross(a: [f64; 2], b: [f64; 2]) -> f64 {
    a[0] * b[1] - a[1] * b[0]
}

pub(super) fn minus(a: [f64; 2], b: [f64; 2]) -> [f64; 2] {
    [a[0] - b[0], a[1] - b[1]]
}

pub(super) fn along(origin: [f64; 2], direction: [f64; 2], distance: f64) -> [f64; 2] {
    [
        origin[0] + distance * direction[0],
        origin[1] + distance * direction[1],
    ]
}

pub(super) fn polar(centre: [f64; 2], radius: f64, angle: f64) -> [f64; 2] {
    along(centre, [angle.cos(), angle.sin()], radius)
}
