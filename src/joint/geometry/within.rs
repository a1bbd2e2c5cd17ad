//! Whether one plan shape lies within, over or beside another.

use crate::{
    joint::{Outline, Patch, Zone, geometry::ON_EDGE},
    numerics::polygon,
};

/// Shapes may reach beyond each other by this, m.
const SLACK: f64 = 1e-9;

/// Points along each side of a lattice laid over a shape.
const LATTICE: usize = 64;

/// An outline at its origin.
pub(in crate::joint) type Placed<'o> = (&'o Outline, [f64; 2]);

/// Whether two placed outlines share more than a line.
pub(in crate::joint) fn overlap(first: Placed<'_>, second: Placed<'_>) -> bool {
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
            beside(0).hypot(beside(1)) < *radius
        }
        ((Outline::Disc { radius }, centre), (other @ Outline::Polygon { .. }, origin))
        | ((other @ Outline::Polygon { .. }, origin), (Outline::Disc { radius }, centre)) => {
            other.depth(less(centre, origin)) > -radius
        }
        _ => paths_overlap(first, second),
    }
}

fn less(point: [f64; 2], origin: [f64; 2]) -> [f64; 2] {
    [point[0] - origin[0], point[1] - origin[1]]
}

/// Whether two outlines with corners overlap: edges cross, a corner lies inside the other, or,
/// where all edges lie on each other, a point does.
fn paths_overlap(first: Placed<'_>, second: Placed<'_>) -> bool {
    let path = |(outline, origin): Placed<'_>| -> Vec<[f64; 2]> {
        let points = outline.path().unwrap_or_default();
        let moved = points.iter().map(|[x, y]| [x + origin[0], y + origin[1]]);
        moved.collect()
    };
    let (one, other) = (path(first), path(second));
    let reaches_in = |points: &[[f64; 2]], (outline, origin): Placed<'_>| {
        points
            .iter()
            .any(|point| outline.depth(less(*point, origin)) > ON_EDGE)
    };
    reaches_in(&one, second)
        || reaches_in(&other, first)
        || polygon::edges(&one)
            .any(|edge| polygon::edges(&other).any(|across| polygon::cross(edge, across, 0.0)))
        || lattice(polygon::bounds(&one)).any(|point| {
            first.0.depth(less(point, first.1)) > ON_EDGE
                && second.0.depth(less(point, second.1)) > ON_EDGE
        })
}

/// What has bounds and an inside.
pub(in crate::joint) trait Shape {
    /// Left, lower, right and upper bound, m.
    fn bounds(&self) -> [f64; 4];
    /// Whether a point lies inside or on the edge.
    fn contains(&self, point: [f64; 2]) -> bool;
}

impl Shape for Outline {
    fn bounds(&self) -> [f64; 4] {
        self.bounds()
    }

    fn contains(&self, point: [f64; 2]) -> bool {
        self.contains(point)
    }
}

impl Shape for Patch {
    fn bounds(&self) -> [f64; 4] {
        self.bounds()
    }

    fn contains(&self, point: [f64; 2]) -> bool {
        self.contains(point)
    }
}

/// Points evenly over a rectangle, none on its edge.
fn lattice([left, lower, right, upper]: [f64; 4]) -> impl Iterator<Item = [f64; 2]> {
    let share = |index: usize| (index as f64 + 0.5) / LATTICE as f64;
    (0..LATTICE * LATTICE).map(move |index| {
        [
            left + (right - left) * share(index % LATTICE),
            lower + (upper - lower) * share(index / LATTICE),
        ]
    })
}

/// Whether a zone lies inside an outline whose origin is that of the joint, to a nanometre.
pub(in crate::joint) fn holds_zone(outline: &Outline, zone: Zone) -> bool {
    match zone {
        Zone::Face => true,
        Zone::Disc { centre, radius } => holds_patch(outline, &Patch::Disc { centre, radius }),
        Zone::Rectangle { centre, size } => {
            holds_patch(outline, &Patch::Rectangle { centre, size })
        }
    }
}

/// Whether a patch lies inside an outline, to a nanometre.
///
/// Corners inside are enough in a rectangle or a disc; a polygon may also reach into the patch
/// with a corner of its own or cut through it.
pub(in crate::joint) fn holds_patch(outline: &Outline, patch: &Patch) -> bool {
    if let Patch::Disc { centre, radius } = patch {
        return outline.depth(*centre) - radius >= -SLACK;
    }
    let path = patch.path().unwrap_or_default();
    let inside = path.iter().all(|corner| outline.depth(*corner) >= -SLACK);
    let Outline::Polygon { points } = outline else {
        return inside;
    };
    let reaches_in = |[from, to]: [[f64; 2]; 2]| {
        let middle = [0, 1].map(|axis| f64::midpoint(from[axis], to[axis]));
        patch.depth(from) > SLACK || patch.depth(middle) > SLACK
    };
    inside
        && !polygon::edges(points).any(|edge| {
            reaches_in(edge) || polygon::edges(&path).any(|side| polygon::cross(edge, side, SLACK))
        })
}

/// Whether cut-outs leave less than about a hundredth of a shape, counted on a lattice.
pub(in crate::joint) fn swallowed(shape: &impl Shape, cutouts: &[Patch]) -> bool {
    let mut inside = 0_usize;
    let mut left = 0_usize;
    for point in lattice(shape.bounds()) {
        if shape.contains(point) {
            inside += 1;
            left += usize::from(!cutouts.iter().any(|cutout| cutout.contains(point)));
        }
    }
    left * 100 < inside
}

#[cfg(test)]
mod tests {
    use super::*;

    const SQUARE: Outline = Outline::Rectangle { size: [2.0, 2.0] };
    const DISC: Outline = Outline::Disc { radius: 1.0 };

    fn polygon(points: &[[f64; 2]]) -> Outline {
        Outline::Polygon {
            points: points.into(),
        }
    }

    /// A U of 3 by 3 with a slot of 1 by 2 from above.
    fn slotted() -> Outline {
        polygon(&[
            [0.0, 0.0],
            [3.0, 0.0],
            [3.0, 3.0],
            [2.0, 3.0],
            [2.0, 1.0],
            [1.0, 1.0],
            [1.0, 3.0],
            [0.0, 3.0],
        ])
    }

    fn rectangle(centre: [f64; 2], size: [f64; 2]) -> Patch {
        Patch::Rectangle { centre, size }
    }

    #[test]
    fn outlines_that_only_touch_do_not_overlap() {
        assert!(!overlap((&SQUARE, [0.0, 0.0]), (&SQUARE, [2.0, 0.0])));
        assert!(overlap((&SQUARE, [0.0, 0.0]), (&SQUARE, [1.9, 0.0])));
        assert!(!overlap((&DISC, [0.0, 0.0]), (&DISC, [2.0, 0.0])));
        assert!(overlap((&DISC, [-0.7, -0.7]), (&SQUARE, [0.0, 0.0])));
        assert!(!overlap((&DISC, [-0.8, -0.8]), (&SQUARE, [0.0, 0.0])));
    }

    #[test]
    fn polygons_overlap_where_they_share_area() {
        let slotted = slotted();
        // In the slot the square shares only edges; deeper it overlaps.
        let small = Outline::Rectangle { size: [1.0, 1.0] };
        assert!(!overlap((&small, [1.0, 1.0]), (&slotted, [0.0, 0.0])));
        assert!(overlap((&small, [1.0, 0.9]), (&slotted, [0.0, 0.0])));
        assert!(overlap((&slotted, [0.0, 0.0]), (&slotted, [0.0, 0.0])));
        assert!(!overlap((&slotted, [0.0, 0.0]), (&slotted, [3.0, 0.0])));
        let pin = Outline::Disc { radius: 0.4 };
        assert!(!overlap((&pin, [1.5, 2.0]), (&slotted, [0.0, 0.0])));
        assert!(overlap((&slotted, [0.0, 0.0]), (&pin, [1.5, 1.3])));
        // A bar across both arms crosses edges without a corner inside.
        let bar = Outline::Rectangle { size: [5.0, 0.2] };
        assert!(overlap((&bar, [-1.0, 2.0]), (&slotted, [0.0, 0.0])));
    }

    #[test]
    fn a_zone_may_touch_the_edge_but_not_cross_it() {
        let zone = |width| Zone::Rectangle {
            centre: [1.0, 1.0],
            size: [width, 2.0],
        };
        assert!(holds_zone(&SQUARE, zone(2.0)));
        assert!(!holds_zone(&SQUARE, zone(2.1)));
        assert!(!holds_zone(
            &DISC,
            Zone::Rectangle {
                centre: [0.0, 0.0],
                size: [1.9, 1.9]
            }
        ));
    }

    #[test]
    fn a_patch_across_a_slot_is_not_held() {
        let slotted = slotted();
        assert!(holds_patch(&slotted, &rectangle([1.5, 0.5], [3.0, 1.0])));
        assert!(holds_patch(&slotted, &rectangle([0.5, 1.5], [1.0, 3.0])));
        // All four corners lie on the arms, the slot runs in between.
        assert!(!holds_patch(&slotted, &rectangle([1.5, 2.0], [2.0, 0.5])));
        assert!(!holds_patch(&slotted, &rectangle([1.5, 2.0], [3.0, 2.0])));
        let disc = |centre| Patch::Disc {
            centre,
            radius: 0.45,
        };
        assert!(holds_patch(&slotted, &disc([0.5, 2.0])));
        assert!(!holds_patch(&slotted, &disc([1.2, 2.0])));
    }

    #[test]
    fn a_plate_is_swallowed_by_what_leaves_nothing_of_it() {
        let halves = [
            rectangle([0.5, 1.0], [1.0, 2.0]),
            rectangle([1.5, 1.0], [1.0, 2.0]),
        ];
        assert!(swallowed(&SQUARE, &halves));
        assert!(!swallowed(&SQUARE, &halves[..1]));
        assert!(!swallowed(&SQUARE, &[]));
    }
}
