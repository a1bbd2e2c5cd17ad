//! Where a plate is, where it stands, and where its straight edges run; in joint coordinates.

use crate::{
    joint::{Patch, Plate},
    numerics::polygon,
};

/// Straight edges nearer to each other than this are one, m.
const SAME_STOP: f64 = 1e-9;
/// Heights of ribs nearer to each other than this are one, m: 7 mm and 0.7 cm differ in their last digit.
/// A micrometre of a rib moves nothing that is printed, and layers far thinner have no stiffness that
/// solvers can tell.
const SAME_HEIGHT: f64 = 1e-6;

impl Plate {
    /// How deep a point of the joint lies inside the outline of this plate, m: negative outside.
    pub fn depth(&self, point: [f64; 2]) -> f64 {
        self.outline.depth(self.own(point))
    }

    /// A point of the joint in the plate's own coordinates, m.
    pub fn own(&self, point: [f64; 2]) -> [f64; 2] {
        [point[0] - self.origin[0], point[1] - self.origin[1]]
    }

    /// Whether there is plate at a point of the joint: inside the outline and outside the
    /// cut-outs, edges included. Bolt holes are not looked at.
    ///
    /// Checked: `a_plate_ends_at_its_edges_and_cutouts`.
    pub fn covers(&self, point: [f64; 2]) -> bool {
        let own = self.own(point);
        self.outline.contains(own) && !self.cutouts.iter().any(|cutout| cutout.surrounds(own))
    }

    /// Whether the plate can touch the other at a point of the joint: on one of its feet, or
    /// anywhere when it has none. That there is plate at all is the matter of [`Plate::covers`].
    ///
    /// Checked: `a_plate_stands_on_its_feet`.
    pub fn stands_at(&self, point: [f64; 2]) -> bool {
        let own = self.own(point);
        self.feet
            .as_ref()
            .is_none_or(|feet| feet.at.iter().any(|foot| foot.contains(own)))
    }

    /// Thickness at a point of the joint, m: with the highest rib there.
    ///
    /// Checked: `ribs_add_to_the_thickness`.
    pub fn thickness_at(&self, point: [f64; 2]) -> f64 {
        let own = self.own(point);
        let here = self.ribs.iter().filter(|rib| rib.patch.contains(own));
        self.thickness + here.map(|rib| rib.height).fold(0.0, f64::max)
    }

    /// Heights of its ribs, m, rising, each once.
    ///
    /// Checked: `a_height_in_two_units_is_one_height`.
    pub fn rib_heights(&self) -> Vec<f64> {
        distinct_heights(self.ribs.iter().map(|rib| rib.height))
    }

    /// Left, lower, right and upper bound in joint coordinates, m.
    pub fn bounds(&self) -> [f64; 4] {
        let [left, lower, right, upper] = self.outline.bounds();
        let [x, y] = self.origin;
        [x + left, y + lower, x + right, y + upper]
    }

    /// Joint coordinates along an axis (0 for x, 1 for y) of every straight edge across it, of
    /// outline, cut-outs, feet and ribs, rising, each once, m. Slanted and round edges have none.
    ///
    /// Checked: `stops_are_the_straight_edges`.
    pub fn stops(&self, axis: usize) -> Vec<f64> {
        let feet = self.feet.iter().flat_map(|feet| &feet.at);
        let ribs = self.ribs.iter().map(|rib| &rib.patch);
        let patches = self.cutouts.iter().chain(feet).chain(ribs);
        let paths = patches.filter_map(Patch::path).chain(self.outline.path());
        let mut stops = Vec::new();
        for path in paths {
            for [from, to] in polygon::edges(&path) {
                if (from[axis] - to[axis]).abs() <= SAME_STOP {
                    stops.push(self.origin[axis] + from[axis]);
                }
            }
        }
        stops.sort_by(f64::total_cmp);
        stops.dedup_by(|next, stop| *next - *stop <= SAME_STOP);
        stops
    }
}

/// Heights, rising, each once.
pub(in crate::joint) fn distinct_heights(heights: impl Iterator<Item = f64>) -> Vec<f64> {
    let mut heights: Vec<f64> = heights.collect();
    heights.sort_by(f64::total_cmp);
    heights.dedup_by(|next, height| *next - *height <= SAME_HEIGHT);
    heights
}

#[cfg(test)]
mod tests {
    use crate::joint::{Feet, Outline, Patch, Plate, Rib, fixture};

    /// A plate of 80 by 40 mm at (10, 5) mm with one of everything.
    fn plate() -> Plate {
        let joint = fixture::joint();
        Plate {
            outline: Outline::Rectangle {
                size: [80e-3, 40e-3],
            },
            origin: [10e-3, 5e-3],
            cutouts: vec![Patch::Rectangle {
                centre: [40e-3, 20e-3],
                size: [20e-3, 10e-3],
            }],
            feet: Some(Feet {
                height: 2e-3,
                at: vec![Patch::Disc {
                    centre: [10e-3, 10e-3],
                    radius: 6e-3,
                }],
            }),
            ribs: vec![
                Rib {
                    patch: Patch::Rectangle {
                        centre: [70e-3, 20e-3],
                        size: [4e-3, 40e-3],
                    },
                    height: 8e-3,
                },
                Rib {
                    patch: Patch::Polygon {
                        points: [[60e-3, 0.0], [80e-3, 0.0], [80e-3, 5e-3]].into(),
                    },
                    height: 3e-3,
                },
            ],
            ..joint.plates[0].clone()
        }
    }

    #[test]
    fn a_plate_ends_at_its_edges_and_cutouts() {
        let plate = plate();
        assert!(plate.covers([15e-3, 10e-3]));
        assert!(!plate.covers([5e-3, 10e-3]));
        assert!(!plate.covers([50e-3, 25e-3]));
        // The edge of a cut-out belongs to the plate.
        assert!(plate.covers([40e-3, 25e-3]));
    }

    #[test]
    fn a_plate_stands_on_its_feet() {
        let plate = plate();
        assert!(plate.stands_at([22e-3, 15e-3]));
        assert!(!plate.stands_at([50e-3, 25e-3]));
        let without = Plate {
            feet: None,
            ..plate
        };
        assert!(without.stands_at([50e-3, 25e-3]));
    }

    #[test]
    fn a_height_in_two_units_is_one_height() {
        let mut plate = plate();
        let with = |height: f64| Rib {
            height,
            ..plate.ribs[0].clone()
        };
        // As 7 mm and 0.7 cm are read: their last digits differ.
        let [one, other] = [7.0 * 1e-3, 0.7 * 1e-2];
        assert!(one > other);
        plate.ribs = vec![with(one), with(other), with(3e-3), with(7.01e-3)];
        assert_eq!(plate.rib_heights(), [3e-3, other, 7.01e-3]);
    }

    #[test]
    fn ribs_add_to_the_thickness() {
        let plate = plate();
        let near = |at: [f64; 2], height: f64| {
            // Two lengths are added.
            (plate.thickness_at(at) - plate.thickness - height).abs() < 1e-15
        };
        assert!(near([20e-3, 20e-3], 0.0));
        assert!(near([80e-3, 20e-3], 8e-3));
        assert!(near([88e-3, 6e-3], 3e-3));
        // Where two ribs cross the higher one counts.
        assert!(near([81e-3, 6e-3], 8e-3));
    }

    #[test]
    fn stops_are_the_straight_edges() {
        let plate = plate();
        let near = |found: Vec<f64>, expected: &[f64]| {
            assert_eq!(found.len(), expected.len(), "{found:?}");
            // Sums of two lengths.
            let same = |(one, other): (&f64, &f64)| (one - other * 1e-3).abs() < 1e-12;
            assert!(found.iter().zip(expected).all(same), "{found:?}");
        };
        near(plate.stops(0), &[10.0, 40.0, 60.0, 78.0, 82.0, 90.0]);
        near(plate.stops(1), &[5.0, 20.0, 30.0, 45.0]);
        let round = Plate {
            outline: Outline::Disc { radius: 0.03 },
            cutouts: Vec::new(),
            ribs: Vec::new(),
            ..plate
        };
        assert!(round.stops(0).is_empty());
    }

    #[test]
    fn bounds_stand_in_joint_coordinates() {
        let [left, lower, right, upper] = plate().bounds();
        let near = |one: f64, other: f64| (one - other).abs() < 1e-15;
        assert!(near(left, 10e-3) && near(lower, 5e-3));
        assert!(near(right, 90e-3) && near(upper, 45e-3));
    }
}
