//! Plan shapes: where a point lies in an outline, and whether outlines overlap.

use crate::joint::{Outline, Plate, Zone};

impl Outline {
    /// How deep a point lies inside, m: the distance to the nearest edge, negative outside.
    pub fn depth(self, point: [f64; 2]) -> f64 {
        match self {
            Self::Rectangle { size } => {
                let across = |axis: usize| point[axis].min(size[axis] - point[axis]);
                across(0).min(across(1))
            }
            Self::Disc { radius } => radius - point[0].hypot(point[1]),
        }
    }

    /// Its centre, in its own coordinates, m.
    pub fn centre(self) -> [f64; 2] {
        match self {
            Self::Rectangle { size } => [size[0] / 2.0, size[1] / 2.0],
            Self::Disc { .. } => [0.0, 0.0],
        }
    }

    /// Its lower left and upper right corner, in its own coordinates, m.
    pub fn corners(self) -> [[f64; 2]; 2] {
        match self {
            Self::Rectangle { size } => [[0.0, 0.0], size],
            Self::Disc { radius } => [[-radius, -radius], [radius, radius]],
        }
    }
}

impl Plate {
    /// How deep a point of the joint lies inside this plate, m: negative outside.
    pub fn depth(&self, point: [f64; 2]) -> f64 {
        depth_at(self.outline, self.origin, point)
    }
}

/// How deep a point lies inside an outline that stands at an origin, m.
pub(super) fn depth_at(outline: Outline, origin: [f64; 2], point: [f64; 2]) -> f64 {
    outline.depth([point[0] - origin[0], point[1] - origin[1]])
}

/// An outline at its origin.
pub(super) type Placed = (Outline, [f64; 2]);

/// Whether two placed outlines share more than a line.
pub(super) fn overlap(first: Placed, second: Placed) -> bool {
    match (first, second) {
        ((Outline::Rectangle { size: a }, at), (Outline::Rectangle { size: b }, to)) => {
            (0..2).all(|axis| {
                let low = at[axis].max(to[axis]);
                let high = (at[axis] + a[axis]).min(to[axis] + b[axis]);
                low < high
            })
        }
        ((Outline::Disc { radius: a }, at), (Outline::Disc { radius: b }, to)) => {
            (at[0] - to[0]).hypot(at[1] - to[1]) < a + b
        }
        ((Outline::Disc { radius }, centre), (Outline::Rectangle { size }, corner))
        | ((Outline::Rectangle { size }, corner), (Outline::Disc { radius }, centre)) => {
            let beside = |axis: usize| {
                let local = centre[axis] - corner[axis];
                local - local.clamp(0.0, size[axis])
            };
            beside(0).hypot(beside(1)) < radius
        }
    }
}

/// Whether a zone lies inside an outline whose origin is that of the joint, to a nanometre.
pub(super) fn holds_zone(outline: Outline, zone: Zone) -> bool {
    let slack = -1e-9;
    match zone {
        Zone::Face => true,
        Zone::Disc { centre, radius } => outline.depth(centre) - radius >= slack,
        Zone::Rectangle { centre, size } => [[-0.5, -0.5], [0.5, -0.5], [-0.5, 0.5], [0.5, 0.5]]
            .iter()
            .all(|corner| {
                outline.depth([
                    centre[0] + corner[0] * size[0],
                    centre[1] + corner[1] * size[1],
                ]) >= slack
            }),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const SQUARE: Outline = Outline::Rectangle { size: [2.0, 2.0] };
    const DISC: Outline = Outline::Disc { radius: 1.0 };

    #[test]
    fn depth_is_the_distance_to_the_nearest_edge() {
        assert!((SQUARE.depth([0.5, 1.0]) - 0.5).abs() < 1e-15);
        assert!((SQUARE.depth([3.0, 1.0]) + 1.0).abs() < 1e-15);
        assert!((DISC.depth([0.6, 0.8])).abs() < 1e-15);
    }

    #[test]
    fn outlines_that_only_touch_do_not_overlap() {
        assert!(!overlap((SQUARE, [0.0, 0.0]), (SQUARE, [2.0, 0.0])));
        assert!(overlap((SQUARE, [0.0, 0.0]), (SQUARE, [1.9, 0.0])));
        assert!(!overlap((DISC, [0.0, 0.0]), (DISC, [2.0, 0.0])));
        assert!(overlap((DISC, [-0.7, -0.7]), (SQUARE, [0.0, 0.0])));
        assert!(!overlap((DISC, [-0.8, -0.8]), (SQUARE, [0.0, 0.0])));
    }

    #[test]
    fn a_zone_may_touch_the_edge_but_not_cross_it() {
        let zone = |width| Zone::Rectangle {
            centre: [1.0, 1.0],
            size: [width, 2.0],
        };
        assert!(holds_zone(SQUARE, zone(2.0)));
        assert!(!holds_zone(SQUARE, zone(2.1)));
        assert!(!holds_zone(
            DISC,
            Zone::Rectangle {
                centre: [0.0, 0.0],
                size: [1.9, 1.9]
            }
        ));
    }
}
