//! One bolt in two equal annular plates: the ring network with a conductance of the radius.

use std::f64::consts::PI;

use crate::resistance::{
    column::{Columns, Inlet, Outlet, Plates},
    network::{Rings, shapes},
};

/// Two equal annular plates about one bolt.
#[derive(Clone, Debug, PartialEq)]
pub struct Annulus {
    /// Radii that bound the rings, m, rising from the hole to the rim.
    pub edges: Vec<f64>,
    /// Thickness of both plates, m.
    pub thickness: [f64; 2],
    /// Conductivity of both plates, W/(m K).
    pub conductivity: [f64; 2],
}

/// Where heat enters and leaves an annular pair.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ends {
    /// Both outer faces isothermal.
    Isothermal,
    /// Uniform flux on both outer faces; area-mean temperatures.
    Flux,
    /// Rim of the first plate to rim of the second, outer faces insulated.
    Lap,
}

impl Annulus {
    /// The rings of the pair, one patch each.
    pub fn rings(&self) -> Rings {
        let area: Vec<f64> = self
            .edges
            .windows(2)
            .map(|pair| PI * (pair[1] - pair[0]) * (pair[1] + pair[0]))
            .collect();
        let (shape, rim_shape) = shapes(self.edges[0], &self.edges, &area);
        Rings {
            columns: Columns {
                plate_area: [area.clone(), area.clone()],
                source_area: area.clone(),
                first_patch: (0..=area.len()).collect(),
                patch_area: area,
            },
            shape: [shape.clone(), shape],
            rim_shape: [rim_shape.clone(), rim_shape],
        }
    }

    /// Resistance between the ends for a conductance of the radius, W/(m² K), K/W.
    ///
    /// The conductance is taken at ring centres. Infinite where no path leads through.
    pub fn resistance(&self, conductance: impl Fn(f64) -> f64, ends: Ends) -> f64 {
        let rings = self.rings();
        let conductance: Vec<f64> = self
            .edges
            .windows(2)
            .map(|pair| conductance(0.5 * (pair[0] + pair[1])))
            .collect();
        let face: f64 = rings.columns.patch_area.iter().sum();
        let (inlet, outlet) = match ends {
            Ends::Isothermal => (Inlet::Temperature, Outlet::Film(f64::INFINITY)),
            Ends::Flux => (Inlet::Flux(face.recip()), Outlet::Flux(face.recip())),
            Ends::Lap => (Inlet::Rim, Outlet::Rim),
        };
        let plates = Plates {
            thickness: self.thickness,
            conductivity: self.conductivity,
            inlet,
            outlet,
        };
        rings
            .flow(&plates, &conductance)
            .map_or(f64::INFINITY, |flow| match ends {
                Ends::Isothermal | Ends::Lap => flow.heat.recip(),
                Ends::Flux => (flow.source - flow.back) / face,
            })
    }
}
