//! Values that the file states with a spread of their own, and how bolts scatter together.

use crate::joint::{Bounds, FillerKind, Joint};

/// A stated value with its spread.
#[derive(Clone, Debug, PartialEq)]
pub struct Uncertain {
    /// Which value.
    pub what: What,
    /// Where it may lie, SI.
    pub bounds: Bounds,
}

/// Which value of the joint is uncertain by its own statement.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum What {
    /// Conductivity of the filler of an interface.
    FillerConductivity(usize),
    /// Thickness of a layer, or of a paste as applied.
    FillerThickness(usize),
    /// Both boundaries of a layer together.
    FillerBoundary(usize),
    /// Thinnest bond line of a paste.
    FillerThinnest(usize),
    /// Emissivity of the faces of a plate.
    Emissivity(usize),
}

/// How much of the scatter of friction a bolt has for itself.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bolts {
    /// Share of the variance that is a bolt's own, 1: 0 for one lot, 1 for independent bolts.
    pub own: f64,
}

impl Bolts {
    /// All bolts lie alike.
    pub const ONE_LOT: Self = Self { own: 0.0 };
    /// Every bolt for itself.
    pub const INDEPENDENT: Self = Self { own: 1.0 };

    /// How this is called.
    pub fn words(&self) -> String {
        if self.own <= 0.0 {
            "one lot, all alike".into()
        } else if self.own >= 1.0 {
            "independent of each other".into()
        } else {
            format!("{:.0} % of the variance each for itself", 100.0 * self.own)
        }
    }
}

impl Joint {
    /// A stated spread at its place in a realisation; none where the file states none.
    fn stated(&self, what: What, places: &[f64]) -> Option<f64> {
        let index = self.uncertain.iter().position(|each| each.what == what)?;
        let place = places.get(index).copied().unwrap_or(0.0);
        Some(self.uncertain[index].bounds.at(place))
    }

    /// The filler of an interface with its stated spreads at their places.
    pub fn filler_at(&self, interface: usize, places: &[f64]) -> Option<FillerKind> {
        let mut kind = self.filler(interface)?.kind.clone();
        let move_to = |value: &mut f64, what: What| {
            if let Some(there) = self.stated(what, places) {
                *value = there;
            }
        };
        match &mut kind {
            FillerKind::Fluid { conductivity } => {
                move_to(conductivity, What::FillerConductivity(interface));
            }
            FillerKind::Foil {
                conductivity,
                thickness,
                ..
            } => {
                move_to(conductivity, What::FillerConductivity(interface));
                move_to(thickness, What::FillerThickness(interface));
            }
            FillerKind::Layer {
                conductivity,
                thickness,
                boundary,
            } => {
                move_to(conductivity, What::FillerConductivity(interface));
                move_to(thickness, What::FillerThickness(interface));
                move_to(boundary, What::FillerBoundary(interface));
            }
            FillerKind::Paste {
                conductivity,
                thinnest,
                applied,
                ..
            } => {
                move_to(conductivity, What::FillerConductivity(interface));
                // A stated bond line is both at once.
                if thinnest.total_cmp(applied).is_eq() {
                    move_to(thinnest, What::FillerThickness(interface));
                }
                move_to(applied, What::FillerThickness(interface));
                move_to(thinnest, What::FillerThinnest(interface));
            }
            FillerKind::Table { .. } => {}
        }
        Some(kind)
    }

    /// Emissivity of a face of an interface, with the stated spread of its plate at its place.
    pub fn emissivity_at(&self, (interface, side): (usize, usize), places: &[f64]) -> f64 {
        self.stated(What::Emissivity(interface + side), places)
            .unwrap_or(self.contact.emissivity[interface][side])
    }
}
