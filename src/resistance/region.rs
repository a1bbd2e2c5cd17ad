//! Convex plan regions around a bolt axis: exact areas inside circles, and arcs of circles inside.

use std::f64::consts::{FRAC_PI_2, PI, TAU};

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

/// A part of the boundary, run through counter-clockwise.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Piece {
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

fn dot(a: [f64; 2], b: [f64; 2]) -> f64 {
    a[0] * b[0] + a[1] * b[1]
}

fn cross(a: [f64; 2], b: [f64; 2]) -> f64 {
    a[0] * b[1] - a[1] * b[0]
}

fn minus(a: [f64; 2], b: [f64; 2]) -> [f64; 2] {
    [a[0] - b[0], a[1] - b[1]]
}

fn along(origin: [f64; 2], direction: [f64; 2], distance: f64) -> [f64; 2] {
    [
        origin[0] + distance * direction[0],
        origin[1] + distance * direction[1],
    ]
}

fn polar(centre: [f64; 2], radius: f64, angle: f64) -> [f64; 2] {
    along(centre, [angle.cos(), angle.sin()], radius)
}

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
    /// closed form on every piece of the boundary.
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

/// Arc pieces short enough that none turns by half a turn as seen from the axis.
fn split_arc(centre: [f64; 2], radius: f64, arc: Arc) -> Vec<Piece> {
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
    fn area_within(&self, circle: f64) -> f64 {
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
