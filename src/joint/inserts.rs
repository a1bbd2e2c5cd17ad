//! Where inserts are in their plate, how far they reach into it, and what a proud one leaves open.

use crate::joint::{Engagement, Fastener, Joint, Ply, PlyKind};

/// Heights below this leave an insert flush, m: far below any roughness.
const FLUSH: f64 = 1e-12;
/// Share of a panel's thickness below which two depths are one: no layer is thinner for the solvers.
const SAME_DEPTH: f64 = 0.01;

impl Joint {
    /// Gap that proud inserts leave between the faces of an interface (0 is the warmest) at a point of
    /// the joint, m: none on the flange that stands out most, its height beside the flanges.
    ///
    /// Checked: `a_proud_insert_leaves_its_height_open_beside_it`.
    pub fn proud_gap(&self, interface: usize, point: [f64; 2]) -> f64 {
        let there = || {
            let holding = |fastener: &&Fastener| self.threaded_interface(fastener) == interface;
            self.fasteners.iter().filter(holding)
        };
        let proud = |fastener: &Fastener| fastener.flange.map_or(0.0, |flange| flange.proud);
        let highest = there().map(proud).fold(0.0, f64::max);
        let under = there().filter(|fastener| fastener.under_flange(point));
        highest - under.map(proud).fold(0.0, f64::max)
    }

    /// Whether no insert stands out of its plate.
    ///
    /// Checked: `a_proud_insert_leaves_its_height_open_beside_it`.
    pub fn is_flush(&self) -> bool {
        let mut flanges = self.fasteners.iter().filter_map(|fastener| fastener.flange);
        flanges.all(|flange| flange.proud <= FLUSH)
    }

    /// Whether an insert fills a sandwich at a point of the joint, all through the layer that begins so
    /// deep below the faying face and is so thick, m.
    pub fn is_filled(&self, point: [f64; 2], ply: &Ply) -> bool {
        let bottom = ply.depth + (1.0 - SAME_DEPTH) * ply.thickness;
        self.fasteners.iter().any(|fastener| {
            let reaches =
                matches!(fastener.engagement, Engagement::Insert { length } if length >= bottom);
            reaches && fastener.under_flange(point)
        })
    }

    /// The layers of a plate (0 is the first) that is a sandwich, from its faying face outwards; none of
    /// any other. The core is divided where inserts end in it.
    ///
    /// Checked: `the_core_is_divided_where_inserts_end`.
    pub fn plies(&self, plate: usize) -> Vec<Ply> {
        let own = &self.plates[plate];
        let Some(sandwich) = &own.sandwich else {
            return Vec::new();
        };
        let whole = own.thickness;
        let mut depths = vec![sandwich.face_sheet, whole - sandwich.face_sheet];
        for fastener in &self.fasteners {
            let Engagement::Insert { length } = fastener.engagement else {
                continue;
            };
            let apart = |depth: &f64| (length - depth).abs() > SAME_DEPTH * whole;
            let inside = depths[0] < length && length < depths[1];
            if inside && depths.iter().all(apart) {
                depths.push(length);
            }
        }
        depths.sort_by(f64::total_cmp);
        depths.push(whole);
        let last = depths.len() - 1;
        let mut depth = 0.0;
        depths
            .into_iter()
            .enumerate()
            .map(|(index, bottom)| {
                let ply = Ply {
                    kind: if index == 0 || index == last {
                        PlyKind::Sheet
                    } else {
                        PlyKind::Core
                    },
                    depth,
                    thickness: bottom - depth,
                };
                depth = bottom;
                ply
            })
            .collect()
    }

    /// The interface at which the threaded plate of a fastener faces the others.
    fn threaded_interface(&self, fastener: &Fastener) -> usize {
        self.far_plate(fastener).saturating_sub(1)
    }
}

impl Fastener {
    /// Whether a point of the joint lies on the flange of one of its inserts.
    fn under_flange(&self, [x, y]: [f64; 2]) -> bool {
        self.flange.is_some_and(|flange| {
            let near = |[a, b]: &[f64; 2]| (x - a).hypot(y - b) <= flange.radius;
            self.places.iter().any(near)
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::joint::{Flange, Plate, Sandwich, fixture};

    /// Far from both inserts.
    const MIDDLE: [f64; 2] = [40e-3, 30e-3];

    /// The fixture on a panel of 20 mm with two inserts at (10, 10) and (70, 50) mm.
    fn joint() -> Joint {
        let mut joint = fixture::joint();
        let insert = joint.plates[1].material.clone();
        joint.plates[1].thickness = 20e-3;
        joint.plates[1].sandwich = Some(Sandwich {
            face_sheet: 0.5e-3,
            core_conductivity: 1.2,
            core_modulus: 5e8,
            insert,
        });
        joint.fasteners[0].engagement = Engagement::Insert { length: 12e-3 };
        joint.fasteners[0].flange = Some(Flange {
            radius: 7e-3,
            proud: 0.1e-3,
        });
        joint
    }

    fn near(one: f64, other: f64) -> bool {
        // Sums and differences of a few lengths below 0.1 m.
        (one - other).abs() < 1e-15
    }

    #[test]
    fn a_proud_insert_leaves_its_height_open_beside_it() {
        let mut joint = joint();
        assert!(near(joint.proud_gap(0, [16e-3, 10e-3]), 0.0));
        assert!(near(joint.proud_gap(0, [18e-3, 10e-3]), 0.1e-3));
        assert!(near(joint.proud_gap(0, MIDDLE), 0.1e-3));
        assert!(!joint.is_flush() && joint.is_flat());
        // A second group that stands out less leaves the difference open on its flanges.
        let mut lower = joint.fasteners[0].clone();
        lower.places = vec![[40e-3, 30e-3]];
        lower.flange = Some(Flange {
            radius: 5e-3,
            proud: 0.07e-3,
        });
        joint.fasteners.push(lower);
        assert!(near(joint.proud_gap(0, MIDDLE), 0.03e-3));
        for fastener in &mut joint.fasteners {
            fastener.flange = fastener.flange.map(|flange| Flange {
                proud: 0.0,
                ..flange
            });
        }
        assert!(joint.is_flush() && near(joint.proud_gap(0, [18e-3, 10e-3]), 0.0));
    }

    #[test]
    fn a_proud_insert_opens_the_interface_of_its_own_plate() {
        let mut joint = joint();
        let shim = Plate {
            sandwich: None,
            flexural_strength: None,
            ..joint.plates[0].clone()
        };
        joint.plates.insert(1, shim);
        assert!(near(joint.proud_gap(0, MIDDLE), 0.0));
        assert!(near(joint.proud_gap(1, MIDDLE), 0.1e-3));
        joint.fasteners[0].head_plate = 2;
        assert!(near(joint.proud_gap(0, MIDDLE), 0.1e-3));
        assert!(near(joint.proud_gap(1, MIDDLE), 0.0));
    }

    #[test]
    fn the_core_is_divided_where_inserts_end() {
        let mut joint = joint();
        assert!(joint.plies(0).is_empty());
        let plies = joint.plies(1);
        let thicknesses = [0.5e-3, 11.5e-3, 7.5e-3, 0.5e-3];
        assert_eq!(plies.len(), thicknesses.len());
        let mut depth = 0.0;
        for (ply, thickness) in plies.iter().zip(thicknesses) {
            assert!(near(ply.thickness, thickness) && near(ply.depth, depth));
            depth += thickness;
        }
        let under = [15e-3, 10e-3];
        let filled = |joint: &Joint| -> Vec<bool> {
            let plies = joint.plies(1);
            plies
                .iter()
                .map(|ply| joint.is_filled(under, ply))
                .collect()
        };
        assert_eq!(filled(&joint), [true, true, false, false]);
        assert!(!joint.is_filled([18e-3, 10e-3], &plies[0]));
        // An insert through the core ends on the far sheet, one of the whole thickness takes that as well.
        joint.fasteners[0].engagement = Engagement::Insert { length: 19.5e-3 };
        assert_eq!(filled(&joint), [true, true, false]);
        joint.fasteners[0].engagement = Engagement::Insert { length: 20e-3 };
        assert_eq!(filled(&joint), [true, true, true]);
    }
}
