//! What stands between two faces, before anything is worked out.

use crate::{
    conductance::{GapGas, Local},
    joint::{FillerKind, Law},
};

/// One faying face.
#[derive(Clone, Debug, PartialEq)]
pub struct Face {
    /// Conductivity of the plate, W/(m K).
    pub conductivity: f64,
    /// Root-mean-square roughness Rq, m.
    pub roughness: f64,
    /// Root-mean-square slope of the asperities, 1.
    pub slope: f64,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Poisson's ratio, 1.
    pub poisson: f64,
    /// Hardness of the bare plate at the depth of the asperities.
    pub hardness: Hardness,
    /// Hemispherical emissivity, 1.
    pub emissivity: f64,
    /// What lies on the face.
    pub coating: Option<Layer>,
}

/// Hardness against the asperities of the other face.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Hardness {
    /// One pressure, load over projected area, Pa.
    Meyer(f64),
    /// Rising towards the surface: Vickers hardness `c1 (d / 1 µm)^c2` of an indentation of
    /// diagonal `d`.
    Micro {
        /// Hardness of a 1 µm indentation, Pa.
        c1: f64,
        /// Size exponent, at most 0.
        c2: f64,
    },
}

/// A plating or film on a face.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Layer {
    /// Thickness, m.
    pub thickness: f64,
    /// Conductivity, W/(m K).
    pub conductivity: f64,
    /// Hardness, Pa; without one the hardness below governs.
    pub hardness: Option<f64>,
    /// A metal, which flows under the asperities; otherwise a film, which breaks when thin.
    pub metal: bool,
}

/// Two faces, the law between them, and what fills their gaps.
#[derive(Clone, Debug, PartialEq)]
pub struct Interface {
    /// The two faces.
    pub faces: [Face; 2],
    /// Law of the solid spots.
    pub law: Law,
    /// Gas in the gaps; none in vacuum.
    pub gas: Option<GapGas>,
    /// Mean temperature, for radiation, K.
    pub temperature: f64,
    /// Filler; it takes the place of the gas, and unless it is a fluid of the spots as well.
    pub filler: Option<FillerKind>,
    /// Measured (pressure, Pa; conductance, W/(m² K)), pressure rising; takes the place of all.
    pub measured: Option<Vec<(f64, f64)>>,
    /// Scatter of law or measurement: multiplies the conductance of the spots or the measured
    /// one; 1 nominal.
    pub solid_factor: f64,
    /// Scatter of the filler: multiplies its resistance; 1 nominal.
    pub filler_factor: f64,
    /// Pressure over true strain of a layer, Pa, where the pressure is that on the layer itself; none
    /// keeps its thickness.
    pub filler_modulus: Option<f64>,
}

impl Interface {
    /// Works out all that does not depend on pressure.
    pub fn prepare(&self) -> Local {
        self.clone().into_local()
    }

    /// The same of an interface that is not needed any more.
    pub(crate) fn into_local(self) -> Local {
        Local::of(self)
    }
}
