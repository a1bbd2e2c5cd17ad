//! Whether a joint is one bolt in round plates, and the problems that it then is.

use crate::{
    estimate::chain::elastic::{level::Level, variant::Variant},
    joint::{Compliance, Engagement, Filler, Joint, Outline, Plate, Sink, Zone},
    pressure::round,
    resistance::round::{Disc, Inlet, Outlet, Patch, Problem},
};

/// Difference of two lengths, over the radius of the plates, that counts as rounding.
const ROUNDING: f64 = 1e-9;

/// Two equal discs around one bolt.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Shape {
    /// Axis of the bolt in joint coordinates, m.
    pub(super) at: [f64; 2],
    pub(super) hole_radius: f64,
    pub(super) bearing_radius: f64,
    pub(super) rim_radius: f64,
    thickness: [f64; 2],
    /// Conductivity through either plate over that in its plane.
    through: [f64; 2],
    inlet: Inlet,
    outlet: Outlet,
}

impl Shape {
    /// The discs of a joint; none unless bolt, discs, holes, seats and heated zone share one axis
    /// and one size, and flat faces of bare plates meet hard.
    pub(super) fn of(joint: &Joint) -> Option<Self> {
        let [first, second] = joint.plates.as_slice() else {
            return None;
        };
        let [fastener] = joint.fasteners.as_slice() else {
            return None;
        };
        let [at] = fastener.places.as_slice() else {
            return None;
        };
        let (Outline::Disc { radius }, Outline::Disc { radius: other }) =
            (&first.outline, &second.outline)
        else {
            return None;
        };
        let near = |a: f64, b: f64| (a - b).abs() <= ROUNDING * radius;
        let centred = |point: [f64; 2]| near(point[0], at[0]) && near(point[1], at[1]);
        let [hole, far_hole] = fastener.outer_holes();
        let head = fastener.head_seat;
        let nut = fastener.nut_seat.unwrap_or(head);
        let seated = matches!(fastener.engagement, Engagement::Nut)
            && near(head.outer_radius, nut.outer_radius)
            && [head, nut].iter().all(|seat| {
                let to_the_hole = seat.inner_radius <= hole || near(seat.inner_radius, hole);
                to_the_hole && hole < seat.outer_radius && seat.outer_radius <= *radius
            });
        let plain = |plate: &Plate| {
            let bare = plate.ribs.is_empty() && plate.cutouts.is_empty() && plate.feet.is_none();
            bare && plate.sandwich.is_none()
        };
        let round = near(*radius, *other)
            && near(hole, far_hole)
            && centred(first.origin)
            && centred(second.origin);
        let bare = joint.is_flat()
            && joint.is_flush()
            && joint.contact.compliance == Compliance::Hard
            && joint.filler(0).and_then(Filler::stiffness).is_none()
            && joint.loose_flatness(0) <= 0.0;
        let (source, sink) = (joint.source.alone()?, joint.sink.alone()?);
        let patch = match source.zone {
            Zone::Face => Patch::Face,
            Zone::Disc { centre, radius } if centred(centre) && radius > hole => {
                Patch::Annulus([hole, radius])
            }
            Zone::Disc { .. } | Zone::Rectangle { .. } => return None,
        };
        (round && seated && bare && plain(first) && plain(second)).then_some(Self {
            at: *at,
            hole_radius: hole,
            bearing_radius: head.outer_radius,
            rim_radius: *radius,
            thickness: [first.thickness, second.thickness],
            through: [first, second].map(|plate| plate.material.through_ratio()),
            inlet: if source.isothermal {
                Inlet::Isothermal(patch)
            } else {
                Inlet::Flux(patch)
            },
            outlet: match sink {
                Sink::IsothermalBack => Outlet::IsothermalBack,
                Sink::Film(coefficient) => Outlet::Film(coefficient),
                Sink::Rim => Outlet::Rim,
            },
        })
    }

    /// The contact of a joint of this shape.
    pub(super) fn contact(
        &self,
        joint: &Joint,
        (level, variant): (Level, Variant),
    ) -> round::Problem {
        let plates = [joint.warm(), joint.cold()];
        round::Problem {
            hole_radius: self.hole_radius,
            bearing_radius: self.bearing_radius,
            rim_radius: self.rim_radius,
            thickness: self.thickness,
            youngs_modulus: plates.map(|plate| plate.material.youngs_modulus.value),
            poisson: plates.map(|plate| plate.material.poisson.value),
            head: variant.head(joint),
            faces: variant.faces(joint),
            tolerance: tolerance(level),
        }
    }

    /// The heat through plates that touch up to a radius (m), for the conductivity in the plane of
    /// both plates and the conductance of the shank.
    pub(super) fn heat(
        &self,
        contact_radius: f64,
        (conductivity, shank): ([f64; 2], f64),
    ) -> Problem {
        Problem {
            plates: [0, 1].map(|plate| Disc {
                hole_radius: self.hole_radius,
                rim_radius: self.rim_radius,
                thickness: self.thickness[plate],
                conductivity: [1.0, self.through[plate]].map(|ratio| ratio * conductivity[plate]),
            }),
            bearing_radius: self.bearing_radius,
            contact_radius,
            inlet: self.inlet,
            outlet: self.outlet,
            shank,
        }
    }
}

/// Error allowed in the contact radius, in bearing radii.
fn tolerance(level: Level) -> f64 {
    match level {
        Level::Coarse => 0.01,
        Level::Fast => 0.006,
        Level::Normal => 0.003,
        Level::Fine => 0.001,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::joint;

    fn shape(sets: &[&str]) -> Option<Shape> {
        let text = include_str!("../../../../../tests/data/joints/round_single.toml");
        let sets: Vec<String> = sets.iter().map(|set| (*set).to_owned()).collect();
        Shape::of(&joint::read_with(text, &sets).expect("a good joint"))
    }

    #[test]
    fn the_reference_pair_is_round_under_any_heads_faces_and_sinks() {
        let plain = shape(&[]).expect("round");
        for (found, stated) in [
            (plain.hole_radius, 3.125e-3),
            (plain.bearing_radius, 5e-3),
            (plain.rim_radius, 30e-3),
        ] {
            // Rounding of a unit.
            assert!((found / stated - 1.0).abs() < 1e-14, "{found} for {stated}");
        }
        for set in [
            "contact.head_model=rigid",
            "contact.faces=stuck",
            "service.medium=air",
            "plate.lower.cooled={ film = \"2000 W/(m²·K)\" }",
        ] {
            assert!(shape(&[set]).is_some(), "{set}");
        }
    }

    #[test]
    fn a_source_about_the_axis_is_an_annulus() {
        let heated = |x: &str| {
            format!("plate.upper.heated={{ centre = [{x}, \"0 mm\"], diameter = \"24 mm\" }}")
        };
        let found = shape(&[&heated("\"0 mm\"")]).expect("round");
        assert_eq!(found.inlet, Inlet::Flux(Patch::Annulus([3.125e-3, 12e-3])));
        assert_eq!(shape(&[&heated("\"1 mm\"")]), None);
    }

    #[test]
    fn whatever_is_not_round_is_left_to_the_columns() {
        for set in [
            "fastener.at=[[\"1 µm\", \"0 mm\"]]",
            "fastener.at=[[\"0 mm\", \"0 mm\"], [\"20 mm\", \"0 mm\"]]",
            "fastener.hole=[\"6.25 mm\", \"6.4 mm\"]",
            "fastener.engagement={ kind = \"tapped\", length = \"5 mm\" }",
            "plate.upper.diameter=\"60.1 mm\"",
            "plate.upper.bow={ kind = \"convex\", height = \"5 µm\" }",
            "plate.lower.finish.flatness=\"5 µm\"",
            "contact.compliance=asperities",
        ] {
            assert_eq!(shape(&[set]), None, "{set}");
        }
    }
}
