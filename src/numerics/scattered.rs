//! A surface through points in the plane, on a grid or scattered.

use spade::{
    DelaunayTriangulation, FloatTriangulation as _, HasPosition, HierarchyHintGenerator, Point2,
    Triangulation as _, mitigate_underflow,
};

/// Coordinates nearer than this share of the extent are one line of a grid.
const SAME_LINE: f64 = 1e-9;

/// A continuous surface through points `[x, y, z]`.
///
/// Points that fill a rectangular grid are joined bilinearly, others by the planes of their
/// Delaunay triangles. Outside, the value of the nearest place of the grid or of the hull holds.
/// No value lies beyond those of the points, and planes are reproduced.
#[derive(Clone, Debug)]
pub struct Surface {
    points: Vec<[f64; 3]>,
    form: Form,
}

impl PartialEq for Surface {
    fn eq(&self, other: &Self) -> bool {
        self.points == other.points
    }
}

#[derive(Clone, Debug)]
enum Form {
    Grid(Grid),
    Triangles(Box<Triangles>),
}

impl Surface {
    /// The surface through points; none where they are fewer than three, on one line, twice the
    /// same in plan, or not finite.
    ///
    /// Checked: `planes_are_reproduced_between_scattered_points`, `a_grid_is_bilinear`,
    /// `points_that_span_nothing_are_refused`.
    pub fn through(points: Vec<[f64; 3]>) -> Option<Self> {
        if points.iter().flatten().any(|value| !value.is_finite()) {
            return None;
        }
        let form = match Grid::of(&points) {
            Some(grid) => Form::Grid(grid),
            None => Form::Triangles(Box::new(Triangles::of(&points)?)),
        };
        Some(Self { points, form })
    }

    /// The points as given.
    pub fn points(&self) -> &[[f64; 3]] {
        &self.points
    }

    /// Height at a point; `NaN` at one that is not finite.
    ///
    /// Checked: `beyond_the_points_the_nearest_place_holds`,
    /// `the_surface_passes_through_its_points`.
    pub fn at(&self, point: [f64; 2]) -> f64 {
        if !point.iter().all(|value| value.is_finite()) {
            return f64::NAN;
        }
        match &self.form {
            Form::Grid(grid) => grid.at(point),
            Form::Triangles(triangles) => triangles.at(point),
        }
    }
}

/// Lines in x and in y, and a height at each of their crossings, x running first.
#[derive(Clone, Debug)]
struct Grid {
    lines: [Vec<f64>; 2],
    heights: Vec<f64>,
}

impl Grid {
    fn of(points: &[[f64; 3]]) -> Option<Self> {
        let lines = [0, 1].map(|axis| lines(points, axis));
        let [columns, rows] = [lines[0].len(), lines[1].len()];
        if columns < 2 || rows < 2 || columns.checked_mul(rows) != Some(points.len()) {
            return None;
        }
        let mut heights = vec![f64::NAN; points.len()];
        for point in points {
            let [column, row] = [0, 1].map(|axis| nearest(&lines[axis], point[axis]));
            heights[row * columns + column] = point[2];
        }
        let filled = heights.iter().all(|height| height.is_finite());
        filled.then_some(Self { lines, heights })
    }

    fn at(&self, point: [f64; 2]) -> f64 {
        let columns = self.lines[0].len();
        let place = |axis: usize| {
            let lines = &self.lines[axis];
            let at = point[axis].clamp(lines[0], lines[lines.len() - 1]);
            let low = lines
                .partition_point(|line| *line <= at)
                .clamp(1, lines.len() - 1)
                - 1;
            (low, (at - lines[low]) / (lines[low + 1] - lines[low]))
        };
        let ((column, across), (row, up)) = (place(0), place(1));
        let along = |row: usize| {
            let low = self.heights[row * columns + column];
            let high = self.heights[row * columns + column + 1];
            low * (1.0 - across) + high * across
        };
        along(row) * (1.0 - up) + along(row + 1) * up
    }
}

/// Distinct coordinates along an axis, rising.
fn lines(points: &[[f64; 3]], axis: usize) -> Vec<f64> {
    let mut lines: Vec<f64> = points.iter().map(|point| point[axis]).collect();
    lines.sort_by(f64::total_cmp);
    let extent = match (lines.first(), lines.last()) {
        (Some(first), Some(last)) => last - first,
        _ => 0.0,
    };
    lines.dedup_by(|next, line| *next - *line <= SAME_LINE * extent);
    lines
}

/// Index of the line nearest to a coordinate.
fn nearest(lines: &[f64], at: f64) -> usize {
    let above = lines.partition_point(|line| *line < at);
    match (above.checked_sub(1), lines.get(above)) {
        (Some(below), Some(line)) if at - lines[below] < line - at => below,
        (Some(below), None) => below,
        _ => above,
    }
}

/// A point of the triangulation with its height.
#[derive(Clone, Copy, Debug)]
struct Knot {
    place: Point2<f64>,
    height: f64,
}

impl HasPosition for Knot {
    type Scalar = f64;

    fn position(&self) -> Point2<f64> {
        self.place
    }
}

/// A hierarchy finds the triangle of a point from the same start every time, so that the digits
/// do not depend on what was asked before.
type Mesh = DelaunayTriangulation<Knot, (), (), (), HierarchyHintGenerator<f64>>;

#[derive(Clone, Debug)]
struct Triangles {
    mesh: Mesh,
    /// Edges of the hull, each end with its height.
    hull: Vec<[[f64; 3]; 2]>,
}

impl Triangles {
    fn of(points: &[[f64; 3]]) -> Option<Self> {
        let knots = points.iter().map(|[x, y, z]| Knot {
            place: mitigate_underflow(Point2::new(*x, *y)),
            height: *z,
        });
        let mesh = Mesh::bulk_load(knots.collect()).ok()?;
        if mesh.num_vertices() != points.len() || mesh.num_inner_faces() == 0 {
            return None;
        }
        let hull = mesh.convex_hull().map(|edge| {
            edge.vertices().map(|vertex| {
                let knot = vertex.data();
                [knot.place.x, knot.place.y, knot.height]
            })
        });
        let hull = hull.collect();
        Some(Self { mesh, hull })
    }

    fn at(&self, [x, y]: [f64; 2]) -> f64 {
        let place = mitigate_underflow(Point2::new(x, y));
        let inside = self
            .mesh
            .barycentric()
            .interpolate(|vertex| vertex.data().height, place);
        inside.unwrap_or_else(|| self.on_the_hull([x, y]))
    }

    /// Height at the place of the hull nearest to a point.
    fn on_the_hull(&self, [x, y]: [f64; 2]) -> f64 {
        let mut nearest = (f64::INFINITY, f64::NAN);
        for [from, to] in &self.hull {
            let along = [to[0] - from[0], to[1] - from[1]];
            let length = along[0] * along[0] + along[1] * along[1];
            let share = ((x - from[0]) * along[0] + (y - from[1]) * along[1]) / length;
            let share = share.clamp(0.0, 1.0);
            let away = [
                x - from[0] - share * along[0],
                y - from[1] - share * along[1],
            ];
            let distance = away[0].hypot(away[1]);
            if distance < nearest.0 {
                nearest = (distance, from[2] * (1.0 - share) + to[2] * share);
            }
        }
        nearest.1
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn plane([x, y]: [f64; 2]) -> f64 {
        1e-5 + 2e-4 * x - 3e-4 * y
    }

    /// Points of no order within 0.1 m, after Weyl: multiples of two irrational numbers.
    fn scattered() -> Vec<[f64; 3]> {
        (0..200)
            .map(|index| {
                let x = 0.1 * (f64::from(index) * 0.754_877_666).fract();
                let y = 0.1 * (f64::from(index) * 0.569_840_291).fract();
                [x, y, plane([x, y])]
            })
            .collect()
    }

    fn grid(height: impl Fn([f64; 2]) -> f64) -> Vec<[f64; 3]> {
        let mut points = Vec::new();
        for x in [0.0, 0.03, 0.1] {
            for y in [-0.02, 0.0, 0.05, 0.08] {
                points.push([x, y, height([x, y])]);
            }
        }
        points
    }

    // Heights are of 1e-5 and the interpolation takes a few products: 1e-18.
    const ROUNDING: f64 = 1e-18;

    #[test]
    fn planes_are_reproduced_between_scattered_points() {
        let surface = Surface::through(scattered()).unwrap();
        assert!(matches!(surface.form, Form::Triangles(_)));
        for point in [[0.05, 0.05], [0.021, 0.077], [0.08, 0.03]] {
            assert!((surface.at(point) - plane(point)).abs() < ROUNDING);
        }
    }

    #[test]
    fn the_surface_passes_through_its_points() {
        let points: Vec<[f64; 3]> = scattered()
            .into_iter()
            .map(|[x, y, _]| [x, y, (900.0 * x).sin() * 1e-5])
            .collect();
        let surface = Surface::through(points.clone()).unwrap();
        for [x, y, z] in points {
            assert!((surface.at([x, y]) - z).abs() < ROUNDING);
        }
    }

    #[test]
    fn a_grid_is_bilinear() {
        let saddle = |[x, y]: [f64; 2]| 1e-5 + 1e-3 * x * y;
        let surface = Surface::through(grid(saddle)).unwrap();
        assert!(matches!(surface.form, Form::Grid(_)));
        for point in [[0.05, 0.06], [0.0, -0.02], [0.1, 0.08], [0.03, 0.01]] {
            assert!((surface.at(point) - saddle(point)).abs() < ROUNDING);
        }
    }

    #[test]
    fn a_grid_with_a_gap_is_scattered() {
        let mut points = grid(plane);
        points.remove(5);
        let surface = Surface::through(points).unwrap();
        assert!(matches!(surface.form, Form::Triangles(_)));
        assert!((surface.at([0.05, 0.02]) - plane([0.05, 0.02])).abs() < ROUNDING);
    }

    #[test]
    fn beyond_the_points_the_nearest_place_holds() {
        let on_grid = Surface::through(grid(plane)).unwrap();
        assert!((on_grid.at([0.2, 0.01]) - plane([0.1, 0.01])).abs() < ROUNDING);
        assert!((on_grid.at([-1.0, -1.0]) - plane([0.0, -0.02])).abs() < ROUNDING);
        let triangle = [[0.0, 0.0, 0.0], [0.1, 0.0, 1e-5], [0.0, 0.1, 3e-5]];
        let surface = Surface::through(triangle.to_vec()).unwrap();
        // Across the slanted side the nearest place is its middle.
        assert!((surface.at([0.1, 0.1]) - 2e-5).abs() < ROUNDING);
        assert!((surface.at([0.3, -0.1]) - 1e-5).abs() < ROUNDING);
        // Continuous over the hull: a nanometre moves the height by less than 1e-12.
        let (inside, outside) = (
            surface.at([0.05 - 1e-9, 0.05]),
            surface.at([0.05 + 1e-9, 0.05]),
        );
        assert!((inside - outside).abs() < 1e-12);
    }

    #[test]
    fn points_that_span_nothing_are_refused() {
        let line: Vec<[f64; 3]> = (0..5)
            .map(|at| [f64::from(at), f64::from(at), 0.0])
            .collect();
        assert!(Surface::through(line).is_none());
        assert!(Surface::through(vec![[0.0, 0.0, 0.0], [1.0, 0.0, 0.0]]).is_none());
        assert!(Surface::through(Vec::new()).is_none());
        let mut twice = scattered();
        twice.push([twice[3][0], twice[3][1], 1.0]);
        assert!(Surface::through(twice).is_none());
        let mut broken = scattered();
        broken[7][2] = f64::NAN;
        assert!(Surface::through(broken).is_none());
    }

    #[test]
    fn places_that_are_not_finite_have_no_height() {
        let surface = Surface::through(scattered()).unwrap();
        assert!(surface.at([f64::NAN, 0.0]).is_nan());
    }
}
