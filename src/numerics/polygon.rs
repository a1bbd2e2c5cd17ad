//! Simple polygons in the plane: area, depth of a point, edges that meet.

/// A point in the plane.
pub type Point = [f64; 2];

/// The edges, the closing one last.
pub fn edges(points: &[Point]) -> impl Iterator<Item = [Point; 2]> + '_ {
    let next = points.iter().cycle().skip(1);
    points.iter().zip(next).map(|(from, to)| [*from, *to])
}

/// Area, positive whichever way round the corners are given.
///
/// Checked: `area_does_not_depend_on_the_direction`.
pub fn area(points: &[Point]) -> f64 {
    let Some(origin) = points.first() else {
        return 0.0;
    };
    // About a corner, so that a small polygon far from the origin keeps its digits.
    let twice = edges(points).map(|[from, to]| {
        (from[0] - origin[0]) * (to[1] - origin[1]) - (to[0] - origin[0]) * (from[1] - origin[1])
    });
    0.5 * twice.sum::<f64>().abs()
}

/// Left, lower, right and upper bound; of no points an empty range.
pub fn bounds(points: &[Point]) -> [f64; 4] {
    points.iter().fold(
        [
            f64::INFINITY,
            f64::INFINITY,
            f64::NEG_INFINITY,
            f64::NEG_INFINITY,
        ],
        |[left, lower, right, upper], [x, y]| {
            [left.min(*x), lower.min(*y), right.max(*x), upper.max(*y)]
        },
    )
}

/// Distance of a point from the nearest edge, negative outside.
///
/// Checked: `depth_is_the_distance_to_the_nearest_edge`.
pub fn depth(points: &[Point], point: Point) -> f64 {
    let mut nearest = f64::INFINITY;
    let mut inside = false;
    for edge @ [from, to] in edges(points) {
        nearest = nearest.min(distance(edge, point));
        // A ray to the right crosses the edge; half-open, so that a corner counts once.
        if (from[1] > point[1]) != (to[1] > point[1]) {
            let share = (point[1] - from[1]) / (to[1] - from[1]);
            inside ^= point[0] < from[0] + share * (to[0] - from[0]);
        }
    }
    if inside { nearest } else { -nearest }
}

/// Distance of a point from a segment.
pub fn distance([from, to]: [Point; 2], point: Point) -> f64 {
    let along = [to[0] - from[0], to[1] - from[1]];
    let away = [point[0] - from[0], point[1] - from[1]];
    let length = along[0] * along[0] + along[1] * along[1];
    let share = if length > 0.0 {
        ((away[0] * along[0] + away[1] * along[1]) / length).clamp(0.0, 1.0)
    } else {
        0.0
    };
    (away[0] - share * along[0]).hypot(away[1] - share * along[1])
}

/// Whether two segments cross, each with both ends farther than a reach from the line of the other.
pub fn cross(one: [Point; 2], other: [Point; 2], reach: f64) -> bool {
    let side = |[from, to]: [Point; 2], point: Point| {
        let along = [to[0] - from[0], to[1] - from[1]];
        let area = along[0] * (point[1] - from[1]) - along[1] * (point[0] - from[0]);
        area / along[0].hypot(along[1])
    };
    let splits = |edge: [Point; 2], ends: [Point; 2]| {
        let [first, second] = ends.map(|end| side(edge, end));
        first * second < 0.0 && first.abs().min(second.abs()) > reach
    };
    splits(one, other) && splits(other, one)
}

/// Whether two segments come within a distance of each other.
pub fn meet(one: [Point; 2], other: [Point; 2], reach: f64) -> bool {
    let apart = (0..2).any(|axis| {
        let ends = |edge: [Point; 2]| {
            let [from, to] = edge.map(|point| point[axis]);
            (from.min(to), from.max(to))
        };
        let ((low, high), (least, most)) = (ends(one), ends(other));
        high + reach < least || most + reach < low
    });
    !apart
        && (cross(one, other, 0.0)
            || other.iter().any(|point| distance(one, *point) <= reach)
            || one.iter().any(|point| distance(other, *point) <= reach))
}

/// The first two edges that meet though they are no neighbours, or that fold back on each other:
/// indices of the corners they start from. A polygon without them is simple.
///
/// Checked: `a_bow_tie_meets_itself`, `a_spike_folds_back`.
pub fn first_meeting(points: &[Point], reach: f64) -> Option<[usize; 2]> {
    let edges: Vec<[Point; 2]> = edges(points).collect();
    let count = edges.len();
    for (first, one) in edges.iter().enumerate() {
        for (second, other) in edges.iter().enumerate().skip(first + 1) {
            let meets = if second == first + 1 {
                folds(*one, *other, reach)
            } else if first == 0 && second + 1 == count {
                folds(*other, *one, reach)
            } else {
                meet(*one, *other, reach)
            };
            if meets {
                return Some([first, second]);
            }
        }
    }
    None
}

/// Whether an edge and the one that follows it lie on each other.
fn folds(one: [Point; 2], next: [Point; 2], reach: f64) -> bool {
    distance(one, next[1]) <= reach || distance(next, one[0]) <= reach
}

#[cfg(test)]
mod tests {
    use super::*;

    /// An L of area 3 about the corner (1, 1).
    const ELL: [Point; 6] = [
        [0.0, 0.0],
        [2.0, 0.0],
        [2.0, 1.0],
        [1.0, 1.0],
        [1.0, 2.0],
        [0.0, 2.0],
    ];
    // Coordinates are small whole numbers: only rounding of a few products.
    const ROUNDING: f64 = 1e-15;

    #[test]
    fn area_does_not_depend_on_the_direction() {
        let mut back = ELL;
        back.reverse();
        assert!((area(&ELL) - 3.0).abs() < ROUNDING);
        assert!((area(&back) - 3.0).abs() < ROUNDING);
        assert!(area(&[]).abs() < ROUNDING);
    }

    #[test]
    fn depth_is_the_distance_to_the_nearest_edge() {
        assert!((depth(&ELL, [0.5, 0.5]) - 0.5).abs() < ROUNDING);
        // In the notch the corner is nearest, then an edge.
        assert!((depth(&ELL, [1.3, 1.4]) + 0.3).abs() < ROUNDING);
        assert!((depth(&ELL, [-3.0, -4.0]) + 5.0).abs() < ROUNDING);
        assert!(depth(&ELL, [1.0, 1.5]).abs() < ROUNDING);
    }

    #[test]
    fn a_ray_through_a_corner_counts_it_once() {
        assert!(depth(&ELL, [-1.0, 1.0]) < 0.0);
        assert!(depth(&ELL, [0.5, 1.0]) > 0.0);
        let tip = [[0.0, 0.0], [2.0, 1.0], [0.0, 2.0]];
        assert!(depth(&tip, [-0.5, 1.0]) < 0.0);
        assert!(depth(&tip, [0.5, 1.0]) > 0.0);
    }

    #[test]
    fn bounds_hold_every_corner() {
        let found = bounds(&ELL);
        let expected = [0.0, 0.0, 2.0, 2.0];
        assert!(
            found
                .iter()
                .zip(expected)
                .all(|(one, other)| (one - other).abs() < ROUNDING)
        );
    }

    #[test]
    fn a_simple_polygon_meets_itself_nowhere() {
        assert_eq!(first_meeting(&ELL, 1e-9), None);
    }

    #[test]
    fn a_bow_tie_meets_itself() {
        let tie = [[0.0, 0.0], [1.0, 1.0], [1.0, 0.0], [0.0, 1.0]];
        assert_eq!(first_meeting(&tie, 1e-9), Some([0, 2]));
        // A corner that lies on another edge meets it as well.
        let touching = [[0.0, 0.0], [4.0, 0.0], [4.0, 2.0], [2.0, 0.0], [0.0, 2.0]];
        assert!(first_meeting(&touching, 1e-9).is_some());
    }

    #[test]
    fn a_spike_folds_back() {
        let spike = [[0.0, 0.0], [2.0, 0.0], [1.0, 0.0], [1.0, 2.0]];
        assert!(first_meeting(&spike, 1e-9).is_some());
        assert!(first_meeting(&[[0.0, 0.0], [1.0, 0.0], [2.0, 0.0]], 1e-9).is_some());
    }

    #[test]
    fn segments_that_share_an_end_do_not_cross() {
        assert!(!cross(
            [[0.0, 0.0], [1.0, 1.0]],
            [[1.0, 1.0], [2.0, 0.0]],
            0.0
        ));
        let crossing = |reach| cross([[0.0, 0.0], [1.0, 1.0]], [[0.0, 1.0], [1.0, 0.0]], reach);
        assert!(crossing(0.0) && crossing(0.7) && !crossing(0.71));
    }
}
