//! What is solved: bodies of layers, bolts that clamp them, how they meet.

use crate::joint::{FaceFriction, HeadModel};

/// Where a layer is, in joint coordinates.
pub type Cover<'a> = dyn Fn([f64; 2]) -> bool + Sync + 'a;

/// A height over the plan, m.
pub type Height<'a> = dyn Fn([f64; 2]) -> f64 + Sync + 'a;

/// Bolted bodies.
#[derive(Clone)]
pub struct Problem<'a> {
    /// Bodies, upper first; heads press on the first, nuts or threads pull at the last.
    pub bodies: Vec<Body<'a>>,
    /// Interfaces between neighbouring bodies, upper first.
    pub interfaces: Vec<Interface<'a>>,
    /// Bolts.
    pub bolts: Vec<Bolt>,
    /// Places across x and across y where a grid line is wanted besides the ends of the bodies, m.
    pub stops: [Vec<f64>; 2],
    /// How heads and nuts press.
    pub head: HeadModel,
    /// How fine the grid is.
    pub fineness: Fineness,
    /// Memory that the solution may take, bytes.
    pub most_bytes: u64,
    /// Told now and then how far it is.
    pub progress: Option<&'a (dyn Fn(Progress) + Sync)>,
}

/// A stack of bonded layers.
#[derive(Clone)]
pub struct Body<'a> {
    /// Layers, upper first: ribs on the outer face, the plate itself, feet on the faying face.
    pub layers: Vec<Layer<'a>>,
    /// Index of the plate itself: heads and nuts press on its outer face.
    pub main: usize,
    /// Least and greatest x, least and greatest y, m.
    pub bounds: [[f64; 2]; 2],
}

/// A layer of one thickness and one material.
#[derive(Clone)]
pub struct Layer<'a> {
    /// Where it is, bolt holes not considered.
    pub cover: &'a Cover<'a>,
    /// Thickness, m.
    pub thickness: f64,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Poisson's ratio, −1 to 0.5, 1.
    pub poisson: f64,
    /// Polynomials through it; none leaves it to the fineness.
    pub through: Option<Through>,
    /// What another material fills of it: inserts in a core.
    pub inlay: Option<Inlay<'a>>,
}

/// A part of a layer that is of another material, bonded to the rest.
#[derive(Clone, Copy)]
pub struct Inlay<'a> {
    /// Where it is, as far as the layer is there.
    pub cover: &'a Cover<'a>,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Poisson's ratio, −1 to 0.5, 1.
    pub poisson: f64,
}

/// Polynomials through a layer.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Through {
    /// Number of elements of equal height.
    pub elements: usize,
    /// Degree, 1 to 3.
    pub degree: usize,
}

/// How two neighbouring bodies meet.
#[derive(Clone, Copy)]
pub struct Interface<'a> {
    /// Distance of the faying faces before any force, m; of any sign, a constant does not matter.
    pub gap: &'a Height<'a>,
    /// Whether they slide.
    pub faces: FaceFriction,
    /// What yields between them.
    pub compliance: Compliance,
}

/// A bolt.
#[derive(Clone, Debug, PartialEq)]
pub struct Bolt {
    /// Axis, m.
    pub at: [f64; 2],
    /// Where the head presses.
    pub head: Annulus,
    /// Clamp force, N; 0 where the bolt is missing and its hole alone is left.
    pub force: f64,
    /// Radius of the hole in every body, m; 0 for none.
    pub hole_radii: Vec<f64>,
    /// What holds the other end.
    pub end: End,
}

/// A ring around a bolt axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Annulus {
    /// Inner radius, m.
    pub inner: f64,
    /// Outer radius, m.
    pub outer: f64,
}

/// What holds a bolt.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum End {
    /// A nut on the outer face of the last body.
    Nut(Annulus),
    /// A thread in the last body, tapped or an insert: shear on a wall of this radius over this length
    /// from the faying face.
    Thread {
        /// Radius of the wall, m.
        radius: f64,
        /// Engaged length, m; at most the thickness.
        length: f64,
    },
}

/// What yields between two faces, as pressure over closure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Compliance {
    /// Nothing: 1e15 Pa/m, so that 1e8 Pa close it by a tenth of a micrometre.
    Hard,
    /// Asperities under the mean contact pressure.
    Asperities {
        /// Pa/m.
        stiffness: f64,
    },
    /// A filling layer that does not pull.
    Layer {
        /// Pa/m.
        stiffness: f64,
    },
}

/// How fine the grid is near bolts and through the thickness.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fineness {
    /// For a first look.
    Coarse,
    /// A few per cent.
    Fast,
    /// One or two per cent.
    Normal,
    /// Below one per cent.
    Fine,
}

/// What the solver is at.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Progress {
    /// Stage.
    pub stage: Stage,
    /// Step within the stage.
    pub step: usize,
    /// Residual reached, relative to the load; not a number where there is none yet.
    pub residual: f64,
}

/// Stages of a solution.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stage {
    /// Lines and covers.
    Grid,
    /// Matrices and their factors.
    Matrices,
    /// Steps of the contact.
    Contact,
}

/// Stiffness of a hard interface, Pa/m.
const HARD: f64 = 1e15;

impl Compliance {
    /// Pressure over closure, Pa/m.
    pub fn stiffness(self) -> f64 {
        match self {
            Self::Hard => HARD,
            Self::Asperities { stiffness } | Self::Layer { stiffness } => stiffness,
        }
    }
}

impl Problem<'_> {
    /// Tells how far the solution is.
    pub(super) fn tell(&self, stage: Stage, step: usize, residual: f64) {
        if let Some(progress) = self.progress {
            progress(Progress {
                stage,
                step,
                residual,
            });
        }
    }

    /// Largest radius that presses or is pressed by a bolt, of all bolts.
    pub(super) fn bearing_radius(&self) -> f64 {
        let outer = self.bolts.iter().map(|bolt| bolt.head.outer);
        outer.fold(0.0, f64::max)
    }
}

impl Body<'_> {
    /// Thickness that bends as one: that of the plate, with core and sheets where inserts bind them, m.
    pub(super) fn bending_thickness(&self) -> f64 {
        let bound = self.layers.iter().filter(|layer| layer.inlay.is_some());
        let bound: f64 = bound.map(|layer| layer.thickness).sum();
        bound.max(self.layers[self.main].thickness)
    }

    /// Thickness of all layers, m.
    pub(super) fn thickness(&self) -> f64 {
        self.layers.iter().map(|layer| layer.thickness).sum()
    }
}
