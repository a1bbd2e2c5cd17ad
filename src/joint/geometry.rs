//! Plan shapes: where a point lies in an outline or a part of a plate, and what lies on what.

mod plates;
mod within;

use crate::{
    joint::{Outline, Patch},
    numerics::polygon,
};

pub(super) use plates::distinct_heights;
pub(super) use within::{holds_patch, holds_zone, overlap, swallowed};

/// A point this near to an edge lies on it, m: coordinates of metres are rounded below it.
const ON_EDGE: f64 = 1e-12;

impl Outline {
    /// How deep a point lies inside, m: the distance to the nearest edge, negative outside.
    pub fn depth(&self, point: [f64; 2]) -> f64 {
        match self {
            Self::Rectangle { size } => {
                let across = |axis: usize| point[axis].min(size[axis] - point[axis]);
                across(0).min(across(1))
            }
            Self::Disc { radius } => radius - point[0].hypot(point[1]),
            Self::Polygon { points } => polygon::depth(points, point),
        }
    }

    /// Whether a point in its own coordinates lies inside or on the edge.
    pub fn contains(&self, point: [f64; 2]) -> bool {
        self.depth(point) >= -ON_EDGE
    }

    /// Its centre, in its own coordinates, m; of a polygon that of its bounds.
    pub fn centre(&self) -> [f64; 2] {
        let [low, high] = self.corners();
        match self {
            Self::Disc { .. } => [0.0, 0.0],
            Self::Rectangle { .. } | Self::Polygon { .. } => {
                [0, 1].map(|axis| f64::midpoint(low[axis], high[axis]))
            }
        }
    }

    /// Lower left and upper right corner of its bounds, in its own coordinates, m.
    pub fn corners(&self) -> [[f64; 2]; 2] {
        let [left, lower, right, upper] = self.bounds();
        [[left, lower], [right, upper]]
    }

    /// Left, lower, right and upper bound, in its own coordinates, m.
    pub fn bounds(&self) -> [f64; 4] {
        match self {
            Self::Rectangle { size } => [0.0, 0.0, size[0], size[1]],
            Self::Disc { radius } => [-radius, -radius, *radius, *radius],
            Self::Polygon { points } => polygon::bounds(points),
        }
    }

    /// Area, m².
    pub fn area(&self) -> f64 {
        match self {
            Self::Rectangle { size } => size[0] * size[1],
            Self::Disc { radius } => std::f64::consts::PI * radius * radius,
            Self::Polygon { points } => polygon::area(points),
        }
    }

    /// Radius over which a bow is measured, m: that of a disc, else half the diagonal of the bounds.
    pub fn bow_radius(&self) -> f64 {
        let [low, high] = self.corners();
        match self {
            Self::Disc { radius } => *radius,
            Self::Rectangle { .. } | Self::Polygon { .. } => {
                0.5 * (high[0] - low[0]).hypot(high[1] - low[1])
            }
        }
    }

    /// Its corners in order; none for a disc.
    pub(super) fn path(&self) -> Option<Vec<[f64; 2]>> {
        match self {
            Self::Disc { .. } => None,
            Self::Rectangle { size: [x, y] } => {
                Some(vec![[0.0, 0.0], [*x, 0.0], [*x, *y], [0.0, *y]])
            }
            Self::Polygon { points } => Some(points.to_vec()),
        }
    }
}

impl Patch {
    /// How deep a point lies inside, m: the distance to the nearest edge, negative outside.
    pub fn depth(&self, point: [f64; 2]) -> f64 {
        match self {
            Self::Rectangle { centre, size } => {
                let beyond = |axis: usize| (point[axis] - centre[axis]).abs() - 0.5 * size[axis];
                let [across, up] = [beyond(0), beyond(1)];
                if across.max(up) <= 0.0 {
                    0.0 - across.max(up)
                } else {
                    0.0 - across.max(0.0).hypot(up.max(0.0))
                }
            }
            Self::Disc { centre, radius } => {
                radius - (point[0] - centre[0]).hypot(point[1] - centre[1])
            }
            Self::Polygon { points } => polygon::depth(points, point),
        }
    }

    /// Whether a point in the plate's own coordinates lies inside or on the edge.
    pub fn contains(&self, point: [f64; 2]) -> bool {
        self.depth(point) >= -ON_EDGE
    }

    /// Whether a point in the plate's own coordinates lies inside, the edge left out.
    pub fn surrounds(&self, point: [f64; 2]) -> bool {
        self.depth(point) > ON_EDGE
    }

    /// Left, lower, right and upper bound, in the plate's own coordinates, m.
    pub fn bounds(&self) -> [f64; 4] {
        let about =
            |[x, y]: [f64; 2], [across, up]: [f64; 2]| [x - across, y - up, x + across, y + up];
        match self {
            Self::Rectangle { centre, size } => about(*centre, size.map(|side| 0.5 * side)),
            Self::Disc { centre, radius } => about(*centre, [*radius; 2]),
            Self::Polygon { points } => polygon::bounds(points),
        }
    }

    /// Area, m².
    pub fn area(&self) -> f64 {
        match self {
            Self::Rectangle { size, .. } => size[0] * size[1],
            Self::Disc { radius, .. } => std::f64::consts::PI * radius * radius,
            Self::Polygon { points } => polygon::area(points),
        }
    }

    /// Its corners in order; none for a disc.
    pub(super) fn path(&self) -> Option<Vec<[f64; 2]>> {
        match self {
            Self::Disc { .. } => None,
            Self::Rectangle { .. } => {
                let [left, lower, right, upper] = self.bounds();
                Some(vec![
                    [left, lower],
                    [right, lower],
                    [right, upper],
                    [left, upper],
                ])
            }
            Self::Polygon { points } => Some(points.to_vec()),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const SQUARE: Outline = Outline::Rectangle { size: [2.0, 2.0] };
    const DISC: Outline = Outline::Disc { radius: 1.0 };
    /// Numbers near one, a few products.
    const ROUNDING: f64 = 1e-15;

    fn ell() -> Outline {
        let points = [
            [0.0, 0.0],
            [2.0, 0.0],
            [2.0, 1.0],
            [1.0, 1.0],
            [1.0, 3.0],
            [0.0, 3.0],
        ];
        Outline::Polygon {
            points: points.into(),
        }
    }

    #[test]
    fn depth_is_the_distance_to_the_nearest_edge() {
        assert!((SQUARE.depth([0.5, 1.0]) - 0.5).abs() < ROUNDING);
        assert!((SQUARE.depth([3.0, 1.0]) + 1.0).abs() < ROUNDING);
        assert!((DISC.depth([0.6, 0.8])).abs() < ROUNDING);
        assert!((ell().depth([0.5, 2.0]) - 0.5).abs() < ROUNDING);
        assert!((ell().depth([1.5, 1.25]) + 0.25).abs() < ROUNDING);
    }

    #[test]
    fn edges_belong_to_an_outline() {
        for (outline, edge) in [
            (SQUARE, [2.0, 1.0]),
            (DISC, [0.0, -1.0]),
            (ell(), [1.0, 2.0]),
        ] {
            assert!(outline.contains(edge), "{outline:?}");
            let beyond = edge.map(|at| at * 1.001);
            assert!(!outline.contains(beyond), "{outline:?}");
        }
    }

    #[test]
    fn areas_and_bow_radii_are_those_of_the_shape() {
        let near = |one: f64, other: f64| (one - other).abs() < ROUNDING;
        assert!(near(SQUARE.area(), 4.0) && near(SQUARE.bow_radius(), 2.0_f64.sqrt()));
        assert!(near(DISC.area(), std::f64::consts::PI) && near(DISC.bow_radius(), 1.0));
        assert!(near(ell().area(), 4.0) && near(ell().bow_radius(), 0.5 * 13.0_f64.sqrt()));
    }

    #[test]
    fn a_patch_beside_a_point_is_as_far_as_its_corner() {
        let patch = Patch::Rectangle {
            centre: [1.0, 1.0],
            size: [2.0, 2.0],
        };
        assert!((patch.depth([5.0, 5.0]) + 18.0_f64.sqrt()).abs() < ROUNDING);
        assert!((patch.depth([1.5, 1.0]) - 0.5).abs() < ROUNDING);
        assert!(patch.contains([2.0, 0.0]) && !patch.surrounds([2.0, 0.0]));
        let disc = Patch::Disc {
            centre: [1.0, 0.0],
            radius: 0.5,
        };
        assert!((disc.depth([3.0, 0.0]) + 1.5).abs() < ROUNDING);
    }
}
