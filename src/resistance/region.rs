//! Convex plan regions around a bolt axis: exact areas inside circles, and arcs of circles inside.

mod piece;

use std::f64::consts::{PI, TAU};

use piece::{Piece, along, dot, minus, polar, split_arc};

/// One side of a convex region; the bolt axis is the origin.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Side {
    /// The half-plane `normal · x ≤ offset`, with a unit normal.
    Line {
        /// Outward unit normal.
        normal: [f64; 2],
        /// Distance of the line from the axis, m; negative when the axis lies outside.
        offset: f64,
    },
    /// The inside of a circle.
    Circle {
        /// Centre, m.
        centre: [f64; 2],
        /// Radius, m.
        radius: f64,
    },
}

/// An angular interval, rad.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Arc {
    /// Angle where it begins.
    pub start: f64,
    /// Angle it covers.
    pub sweep: f64,
}

/// The common part of half-planes and discs, not necessarily around the axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Region {
    sides: Vec<Side>,
    pieces: Vec<Piece>,
}

/// Sides closer than this, relative to their distance, are one side.
const SAME: f64 = 1e-11;

impl Side {
    fn same(&self, other: &Self) -> bool {
        let near = |a: f64, b: f64, scale: f64| (a - b).abs() <= SAME * scale;
        match (self, other) {
            (
                Self::Line { normal, offset },
                Self::Line {
                    normal: direction,
                    offset: distance,
                },
            ) => {
                near(normal[0], direction[0], 1.0)
                    && near(normal[1], direction[1], 1.0)
                    && near(*offset, *distance, offset.abs())
            }
            (
                Self::Circle { centre, radius },
                Self::Circle {
                    centre: middle,
                    radius: size,
                },
            ) => {
                near(centre[0], middle[0], *radius)
                    && near(centre[1], middle[1], *radius)
                    && near(*radius, *size, *radius)
            }
            _ => false,
        }
    }

    /// Whether a point lies inside or on the side.
    fn holds(&self, point: [f64; 2]) -> bool {
        match *self {
            Self::Line { normal, offset } => dot(normal, point) <= offset,
            Self::Circle { centre, radius } => {
                let away = minus(point, centre);
                dot(away, away) <= radius * radius
            }
        }
    }

    /// Direction and cosine that mark the part of a circle outside this side: the angles ψ with
    /// cos(ψ − direction) > cosine.
    fn cut(&self, middle: [f64; 2], size: f64) -> (f64, f64) {
        match *self {
            Self::Line { normal, offset } => (
                normal[1].atan2(normal[0]),
                (offset - dot(normal, middle)) / size,
            ),
            Self::Circle { centre, radius } => {
                let away = minus(middle, centre);
                let distance = dot(away, away).sqrt();
                if distance <= SAME * radius {
                    return (0.0, if size > radius { -2.0 } else { 2.0 });
                }
                (
                    away[1].atan2(away[0]),
                    (radius * radius - distance * distance - size * size) / (2.0 * size * distance),
                )
            }
        }
    }
}

/// The parts of a circle that lie inside all of the sides.
fn arcs_inside<'a>(
    centre: [f64; 2],
    radius: f64,
    sides: impl Iterator<Item = &'a Side>,
) -> Vec<Arc> {
    let mut kept = vec![Arc {
        start: 0.0,
        sweep: TAU,
    }];
    for side in sides {
        let (direction, cosine) = side.cut(centre, radius);
        if cosine >= 1.0 {
            continue;
        }
        if cosine <= -1.0 {
            return Vec::new();
        }
        let half = cosine.acos();
        kept = without(&kept, direction - half, 2.0 * half);
    }
    kept
}

/// Arcs without an interval of angles.
fn without(arcs: &[Arc], start: f64, sweep: f64) -> Vec<Arc> {
    let mut kept = Vec::new();
    for arc in arcs {
        // The gap begins this far after the arc; the gap may also have begun before the arc.
        let begin = (start - arc.start).rem_euclid(TAU);
        let over = (begin + sweep - TAU).max(0.0);
        let first = Arc {
            start: arc.start + over,
            sweep: begin.min(arc.sweep) - over,
        };
        let second = Arc {
            start: arc.start + begin + sweep,
            sweep: arc.sweep - begin - sweep,
        };
        kept.extend([first, second].into_iter().filter(|arc| arc.sweep > 0.0));
    }
    kept
}

impl Region {
    /// The region inside all of the sides; they must bound it.
    pub fn new(sides: &[Side]) -> Self {
        let mut distinct: Vec<Side> = Vec::new();
        for side in sides {
            if !distinct.iter().any(|known| known.same(side)) {
                distinct.push(*side);
            }
        }
        let mut pieces = Vec::new();
        for (index, side) in distinct.iter().enumerate() {
            let others = || {
                distinct
                    .iter()
                    .enumerate()
                    .filter(move |(other, _)| *other != index)
                    .map(|(_, side)| side)
            };
            match *side {
                Side::Line { normal, offset } => {
                    let origin = [normal[0] * offset, normal[1] * offset];
                    pieces.extend(segment_inside(origin, [-normal[1], normal[0]], others()));
                }
                Side::Circle { centre, radius } => pieces.extend(
                    arcs_inside(centre, radius, others())
                        .into_iter()
                        .flat_map(|arc| split_arc(centre, radius, arc)),
                ),
            }
        }
        Self {
            sides: distinct,
            pieces,
        }
    }

    /// Area inside the circle of a radius about the axis, m²; the whole area for an infinite one.
    ///
    /// ```text
    /// A(r) = ½ ∮ min(r, ρ)² dθ
    /// ```
    ///
    /// Exact: closed form on every piece of the boundary. Source: sector formula of an area in polar coordinates.
    pub fn area_within(&self, radius: f64) -> f64 {
        self.pieces
            .iter()
            .map(|piece| piece.area_within(radius))
            .sum()
    }

    /// Distance of the farthest point from the axis, m.
    pub fn farthest(&self) -> f64 {
        self.pieces
            .iter()
            .flat_map(|piece| match *piece {
                Piece::Segment { from, to } => [from, to],
                Piece::Arc {
                    centre,
                    radius,
                    start,
                    sweep,
                } => [start, start + sweep].map(|angle| polar(centre, radius, angle)),
            })
            .map(|point| dot(point, point).sqrt())
            .fold(0.0, f64::max)
    }

    /// Whether a point, seen from the axis, lies inside.
    pub fn contains(&self, point: [f64; 2]) -> bool {
        self.sides.iter().all(|side| side.holds(point))
    }

    /// The parts of the circle of a radius about the axis that lie inside.
    pub fn arcs(&self, radius: f64) -> Vec<Arc> {
        arcs_inside([0.0; 2], radius, self.sides.iter())
    }

    /// Whether the whole disc of a radius about the axis lies inside.
    pub fn holds_disc(&self, size: f64) -> bool {
        self.sides.iter().all(|side| match *side {
            Side::Line { offset, .. } => offset >= size,
            Side::Circle { centre, radius } => radius - dot(centre, centre).sqrt() >= size,
        })
    }
}

/// The part of a line that lies inside all of the sides.
fn segment_inside<'a>(
    origin: [f64; 2],
    direction: [f64; 2],
    sides: impl Iterator<Item = &'a Side>,
) -> Option<Piece> {
    let (mut low, mut high) = (f64::NEG_INFINITY, f64::INFINITY);
    for side in sides {
        match *side {
            Side::Line { normal, offset } => {
                let slope = dot(normal, direction);
                let room = offset - dot(normal, origin);
                if slope.abs() < SAME {
                    if room < 0.0 {
                        return None;
                    }
                } else if slope > 0.0 {
                    high = high.min(room / slope);
                } else {
                    low = low.max(room / slope);
                }
            }
            Side::Circle { centre, radius } => {
                let from = minus(origin, centre);
                let half = dot(from, direction);
                let root = half * half - dot(from, from) + radius * radius;
                if root <= 0.0 {
                    return None;
                }
                low = low.max(-half - root.sqrt());
                high = high.min(-half + root.sqrt());
            }
        }
    }
    (low < high).then(|| Piece::Segment {
        from: along(origin, direction, low),
        to: along(origin, direction, high),
    })
}

/// Arcs without the parts inside a disc.
pub fn outside_disc(arcs: &[Arc], size: f64, disc: ([f64; 2], f64)) -> Vec<Arc> {
    let (centre, radius) = disc;
    let distance = dot(centre, centre).sqrt();
    let cosine = (distance * distance + size * size - radius * radius) / (2.0 * size * distance);
    if cosine >= 1.0 {
        return arcs.to_vec();
    }
    let half = cosine.max(-1.0).acos().min(PI);
    without(arcs, centre[1].atan2(centre[0]) - half, 2.0 * half)
}

#[cfg(test)]
mod tests;
