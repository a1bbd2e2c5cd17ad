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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::resistance::network::edges;

    fn annulus() -> Annulus {
        Annulus {
            edges: edges(0.5, 1.4, 3.0, 40),
            thickness: [0.4, 1.1],
            conductivity: [2.0, 0.7],
        }
    }

    // π (b² − a²), ring by ring and in all.
    #[test]
    fn rings_have_their_areas() {
        let annulus = annulus();
        let columns = annulus.rings().columns;
        for (pair, area) in annulus.edges.windows(2).zip(&columns.patch_area) {
            let exact = PI * (pair[1] * pair[1] - pair[0] * pair[0]);
            // Squares of narrow rings cancel.
            assert!((area / exact - 1.0).abs() < 1e-12);
        }
        for areas in [&columns.plate_area[0], &columns.plate_area[1]] {
            let whole: f64 = areas.iter().sum();
            assert!((whole / (PI * (9.0 - 0.25)) - 1.0).abs() < 1e-12);
        }
    }

    // Walls in series, t/(k A) and 1/(h A): the rings contain them, and rounding is left.
    #[test]
    fn an_even_conductance_is_a_composite_wall() {
        let area = PI * (9.0 - 0.25);
        let wall = (0.4 / 2.0 + 1.1 / 0.7 + 1.0 / 3.0) / area;
        for ends in [Ends::Isothermal, Ends::Flux] {
            let found = annulus().resistance(|_| 3.0, ends);
            assert!((found / wall - 1.0).abs() < 1e-10, "{ends:?} {found}");
        }
    }
}
