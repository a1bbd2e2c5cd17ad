//! The checked plates: outline, openings, pads, ribs, faces and what bends them.

use std::sync::Arc;

use crate::{
    catalog::{self, Material},
    joint::{Bounds, FlatnessMap, Sandwich, slope_from_roughness},
    numerics::distribution::deviations,
};

/// One plate.
#[derive(Clone, Debug, PartialEq)]
pub struct Plate {
    /// Name by which other tables and results call it.
    pub name: String,
    /// Material, from the catalogue or the file.
    pub material: Material,
    /// Strength in bending of a brittle plate, Pa, where it is stated.
    pub flexural_strength: Option<f64>,
    /// Thickness, m.
    pub thickness: f64,
    /// Outline in plan, in the plate's own coordinates.
    pub outline: Outline,
    /// Where the plate's own origin lies in joint coordinates, m.
    pub origin: [f64; 2],
    /// The faying face; of a plate between others the one towards the warm side, and the other as
    /// well unless `underside` says otherwise.
    pub finish: Finish,
    /// Stated total out-of-flatness of the faying face, m.
    pub flatness: Option<f64>,
    /// The face towards the cold side of a plate between others, where it differs.
    pub underside: Option<Underside>,
    /// Height of a known bow, m: positive concave (open at the centre), negative convex. A plate
    /// between others is bent as a whole, as its face towards the warm side shows it.
    pub bow: Option<f64>,
    /// Measured heights of the faying face, in place of a bow.
    pub flatness_map: Option<Arc<FlatnessMap>>,
    /// Curvature that temperatures give the plate.
    pub sag: Option<Sag>,
    /// Openings through the whole thickness.
    pub cutouts: Vec<Patch>,
    /// Pads under the faying face; with them only the pads touch.
    pub feet: Option<Feet>,
    /// Parts of larger thickness on the outer face.
    pub ribs: Vec<Rib>,
    /// Core between two face sheets, of which the material is then that of the plate.
    pub sandwich: Option<Sandwich>,
}

/// The face towards the cold side of a plate between others.
#[derive(Clone, Debug, PartialEq)]
pub struct Underside {
    /// Roughness, slope and plating.
    pub finish: Finish,
    /// Stated total out-of-flatness, m.
    pub flatness: Option<f64>,
}

/// Which way a faying face looks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Facing {
    /// Towards the first plate.
    Warm,
    /// Towards the last plate.
    Cold,
}

/// Shape in plan.
#[derive(Clone, Debug, PartialEq)]
pub enum Outline {
    /// From the origin (lower left corner) to `size`, m.
    Rectangle {
        /// Width and height, m.
        size: [f64; 2],
    },
    /// About the origin.
    Disc {
        /// Radius, m.
        radius: f64,
    },
    /// A simple polygon in either direction, closed from the last point to the first.
    Polygon {
        /// Corners, m; at least three.
        points: Arc<[[f64; 2]]>,
    },
}

/// A part of a plate in plan, in the plate's own coordinates.
#[derive(Clone, Debug, PartialEq)]
pub enum Patch {
    /// A rectangle parallel to the axes.
    Rectangle {
        /// Centre, m.
        centre: [f64; 2],
        /// Width and height, m.
        size: [f64; 2],
    },
    /// A disc.
    Disc {
        /// Centre, m.
        centre: [f64; 2],
        /// Radius, m.
        radius: f64,
    },
    /// A simple polygon in either direction.
    Polygon {
        /// Corners, m; at least three.
        points: Arc<[[f64; 2]]>,
    },
}

/// Pads under a faying face.
#[derive(Clone, Debug, PartialEq)]
pub struct Feet {
    /// How far they stand out of the face, m.
    pub height: f64,
    /// Where they stand; at least one.
    pub at: Vec<Patch>,
}

/// A part of larger thickness on the outer face: a rib or a wall.
#[derive(Clone, Debug, PartialEq)]
pub struct Rib {
    /// Where it stands.
    pub patch: Patch,
    /// How far it stands out of the outer face, m.
    pub height: f64,
}

/// What curves a plate; [`crate::joint::Joint::sag_curvature`] gives the curvature.
#[derive(Clone, Debug, PartialEq)]
pub enum Sag {
    /// A heat flux through the thickness, W/m²: positive from the first plate to the second.
    Flux(f64),
    /// The stated heat of the joint, evenly over the outline of the plate.
    Heat,
    /// The curvature itself, 1/m: positive concave at the faying face.
    Curvature(f64),
    /// A second layer on the outer face, which expands by another measure.
    Bimetal(Box<Bimetal>),
}

/// A layer bonded to the outer face of a plate.
#[derive(Clone, Debug, PartialEq)]
pub struct Bimetal {
    /// Its material.
    pub material: Material,
    /// Its thickness, m.
    pub thickness: f64,
    /// Change of temperature since both were flat together, K.
    pub change: f64,
}

/// The faying face of a plate.
#[derive(Clone, Debug, PartialEq)]
pub struct Finish {
    /// Root-mean-square roughness Rq, m.
    pub roughness: Bounds,
    /// Root-mean-square slope of the asperities, 1.
    pub slope: f64,
    /// Factor by which the slope may be off either way, one standard deviation.
    pub slope_factor: f64,
    /// Where the slope may lie, 1, where the file states its spread; it then replaces the factor.
    pub slope_spread: Option<Bounds>,
    /// What lies on the face.
    pub coating: Option<Coating>,
}

impl Finish {
    /// Slope of the asperities at a place of its scatter, 1, of a face whose roughness, m, is somewhere in
    /// its range: a slope by the rule follows the roughness.
    pub fn slope_at(&self, place: f64, roughness: f64) -> f64 {
        match self.slope_spread {
            Some(spread) => spread.at(place),
            None if self.slope_factor > 1.0 => {
                let steeper =
                    slope_from_roughness(roughness) / slope_from_roughness(self.roughness.nominal);
                self.slope * steeper * self.slope_factor.powf(deviations(place))
            }
            // An end of the scatter is infinitely far, and no scatter stays none there.
            None => self.slope,
        }
    }

    /// Whether the slope scatters.
    pub fn slope_scatters(&self) -> bool {
        self.slope_factor > 1.0 || self.slope_spread.is_some_and(|spread| spread.is_spread())
    }
}

/// A plating or film on a face.
#[derive(Clone, Debug, PartialEq)]
pub struct Coating {
    /// The catalogue record.
    pub plating: catalog::Plating,
    /// Thickness, m.
    pub thickness: f64,
}
