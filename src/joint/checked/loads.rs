//! What a bolt bears besides its tightening, and what springs under it.

use crate::joint::Bounds;

/// A load from outside along the axis of each bolt of a group, pulling.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AxialLoad {
    /// In any case that states none of its own, N.
    pub any: Option<Bounds>,
    /// In the hot case, N.
    pub hot: Option<Bounds>,
    /// In the cold case, N.
    pub cold: Option<Bounds>,
    /// Load introduction factor n: where between faying face (0) and head (1) the load enters.
    pub introduction: Bounds,
    /// Factor by which the load must be able to grow before the faces part, 1.
    pub safety: f64,
    /// Whether it acts while the heat is judged, so that the faces have the less force.
    pub lasting: bool,
}

impl AxialLoad {
    /// The load in a case, N.
    pub fn in_case(&self, case: &str) -> Bounds {
        let own = match case {
            "hot" => self.hot,
            "cold" => self.cold,
            _ => None,
        };
        own.or(self.any).unwrap_or(Bounds::exact(0.0))
    }
}

/// Disc springs under the head or nut of each bolt, all alike.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DiscSprings {
    /// Outer diameter, m.
    pub outer_diameter: f64,
    /// Inner diameter, m.
    pub inner_diameter: f64,
    /// Thickness, m.
    pub thickness: f64,
    /// Height of the free cone, m.
    pub cone_height: f64,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Poisson's ratio, 1.
    pub poisson: f64,
    /// Discs nested in one set.
    pub parallel: u32,
    /// Sets head to head.
    pub series: u32,
}

/// The spring washer under a head.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum LockWasher {
    /// There is none.
    #[default]
    None,
    /// A split ring, which keeps no force.
    Split,
}

/// How an insert is held in its plate.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct InsertHold {
    /// Pull-out load by its maker or a test, N.
    pub pull_out: Option<f64>,
    /// Outer diameter of its thread in the plate, m.
    pub outer_diameter: Option<f64>,
}
