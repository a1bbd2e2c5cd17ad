//! A measured map of a faying face.

use crate::numerics::scattered::Surface;

/// Heights of a faying face, measured at points of the plate.
#[derive(Clone, Debug, PartialEq)]
pub struct FlatnessMap {
    surface: Surface,
}

impl FlatnessMap {
    /// A map through points `[x, y, z]`, m: plan in the plate's own coordinates, height positive
    /// towards the other plate. None where the points span no area, stand twice or are not finite.
    pub fn new(points: Vec<[f64; 3]>) -> Option<Self> {
        Surface::through(points).map(|surface| Self { surface })
    }

    /// The points as given, m.
    pub fn points(&self) -> &[[f64; 3]] {
        self.surface.points()
    }

    /// Height at a point in the plate's own coordinates, m: positive towards the other plate.
    ///
    /// A full grid is read bilinearly; scattered points by the planes of their Delaunay triangles.
    /// Beyond the points the height of the nearest place among them holds. Continuous everywhere.
    ///
    /// Checked: `the_map_is_read_between_its_points`, and in `numerics::scattered`.
    pub fn height_at(&self, point: [f64; 2]) -> f64 {
        self.surface.at(point)
    }

    /// Largest height, m.
    pub fn highest(&self) -> f64 {
        let heights = self.points().iter().map(|point| point[2]);
        heights.fold(f64::NEG_INFINITY, f64::max)
    }

    /// Smallest height, m.
    pub fn lowest(&self) -> f64 {
        let heights = self.points().iter().map(|point| point[2]);
        heights.fold(f64::INFINITY, f64::min)
    }
}
