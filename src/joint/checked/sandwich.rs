//! A plate of two face sheets on a core, and the inserts whose flanges carry the clamp force on it.

use crate::catalog::Material;

/// What a sandwich panel has besides its face sheets, whose material is that of the plate.
#[derive(Clone, Debug, PartialEq)]
pub struct Sandwich {
    /// Thickness of either face sheet, m.
    pub face_sheet: f64,
    /// Conductivity of the core through the thickness, cell walls and voids together, W/(m K).
    pub core_conductivity: f64,
    /// Young's modulus of the core through the thickness, Pa.
    pub core_modulus: f64,
    /// Material that fills the panel below the flange of an insert, over the length of the insert.
    pub insert: Material,
}

/// The flange of an insert on the faying face.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Flange {
    /// Outer radius, m.
    pub radius: f64,
    /// Height above the face sheet, m; 0 is flush.
    pub proud: f64,
}

/// A bonded layer of a sandwich.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ply {
    /// What it is beside the inserts.
    pub kind: PlyKind,
    /// Depth of its upper side below the faying face, m.
    pub depth: f64,
    /// Thickness, m.
    pub thickness: f64,
}

/// What a layer of a sandwich is beside the inserts.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PlyKind {
    /// A face sheet.
    Sheet,
    /// Core.
    Core,
}
