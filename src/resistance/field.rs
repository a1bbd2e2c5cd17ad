//! The pressure field on the faying faces: points for maps, rings for tables, areas and radii.

use crate::{
    numerics::roots,
    resistance::{
        cells::{Cell, Cells},
        path::Load,
    },
};

/// One ring around one bolt.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RingRow {
    /// Inner and outer radius, m.
    pub radius: [f64; 2],
    /// Area of the faying face inside the bolt's own cell, m².
    pub area: f64,
    /// Mean pressure, Pa.
    pub pressure: f64,
    /// Area mean of the local conductance, W/(m² K).
    pub conductance: f64,
    /// Conductance of the ring, W/K.
    pub share: f64,
    /// Sum from the hole to this ring, W/K.
    pub cumulative: f64,
}

impl Cells {
    /// Pressure at a point in joint coordinates, Pa; none off the faying faces or in a hole.
    pub fn pressure_at(&self, point: [f64; 2], forces: &[f64]) -> Option<f64> {
        if !self.on_the_faces(point) {
            return None;
        }
        let mut pressure = 0.0;
        for (bolt, site) in self.plan.sites.iter().enumerate() {
            let radius = (point[0] - site.at[0]).hypot(point[1] - site.at[1]);
            if radius < self.plan.hole_radius(bolt) {
                return None;
            }
            pressure += site.cone.pressure(radius, forces[bolt]) * self.restored[bolt];
        }
        let in_a_hole = self.plan.empty.iter().any(|hole| {
            (point[0] - hole.at[0]).hypot(point[1] - hole.at[1]) < hole.radius_in(None)
        });
        (!in_a_hole).then_some(pressure)
    }

    /// Highest pressure on the faying faces, Pa.
    pub fn peak_pressure(&self, forces: &[f64]) -> f64 {
        let at_holes = self.plan.sites.iter().enumerate().flat_map(|(bolt, site)| {
            // At a hole edge pressure is highest; neighbours tell on which side.
            const PLACES: u32 = 24;
            let radius = self.plan.hole_radius(bolt).max(site.cone.hole_radius) * (1.0 + 1e-9);
            (0..PLACES).filter_map(move |place| {
                let angle = std::f64::consts::TAU * f64::from(place) / f64::from(PLACES);
                let point = [
                    site.at[0] + radius * angle.cos(),
                    site.at[1] + radius * angle.sin(),
                ];
                self.pressure_at(point, forces)
            })
        });
        at_holes.fold(0.0, f64::max)
    }

    /// Area under pressure, m².
    pub fn contact_area(&self) -> f64 {
        self.fine
            .iter()
            .flat_map(|cell| {
                let areas = &cell.rings.columns.patch_area;
                (0..areas.len())
                    .filter(|patch| !cell.patches.of(*patch).is_empty())
                    .map(|patch| areas[patch])
            })
            .sum()
    }

    /// Force carried by all patches, N.
    pub fn force_carried(&self, forces: &[f64]) -> f64 {
        self.fine
            .iter()
            .flat_map(|cell| (0..cell.edges.len() - 1).map(|ring| cell.ring_force(ring, forces)))
            .sum()
    }

    /// Distance from the nearest bolt axis that holds a share of the whole force, m.
    pub fn radius_holding(&self, share: f64, forces: &[f64]) -> f64 {
        let rings: Vec<(f64, f64, f64)> = self
            .fine
            .iter()
            .flat_map(|cell| {
                cell.edges
                    .windows(2)
                    .enumerate()
                    .map(|(ring, pair)| (pair[0], pair[1], cell.ring_force(ring, forces)))
            })
            .collect();
        let within = |radius: f64| -> f64 {
            rings
                .iter()
                .map(|(inner, outer, force)| {
                    // Uniform pressure inside a ring.
                    let part =
                        (radius - inner) * (radius + inner) / ((outer - inner) * (outer + inner));
                    force * part.clamp(0.0, 1.0)
                })
                .sum()
        };
        let wanted = share * self.force_carried(forces);
        let farthest = rings.iter().fold(0.0, |far: f64, ring| ring.1.max(far));
        roots::halved(|radius| within(radius) < wanted, 0.0, farthest)
    }

    /// The rings around one bolt that lie on the faying faces, from the hole outward.
    pub fn rings<H: Fn(f64) -> f64>(&self, load: &Load<H>, bolt: usize) -> Vec<RingRow> {
        let cell = &self.fine[bolt];
        let mut cumulative = 0.0;
        let mut rows = Vec::new();
        for (ring, pair) in cell.edges.windows(2).enumerate() {
            let patches =
                cell.rings.columns.first_patch[ring]..cell.rings.columns.first_patch[ring + 1];
            let area: f64 = cell.rings.columns.patch_area[patches.clone()].iter().sum();
            if area <= 0.0 {
                continue;
            }
            let share: f64 = patches
                .map(|patch| {
                    let pressure = cell.patches.pressure(patch, load.forces);
                    cell.rings.columns.patch_area[patch] * (load.conductance)(pressure)
                })
                .sum();
            cumulative += share;
            rows.push(RingRow {
                radius: [pair[0], pair[1]],
                area,
                pressure: cell.ring_force(ring, load.forces) / area,
                conductance: share / area,
                share,
                cumulative,
            });
        }
        rows
    }

    fn on_the_faces(&self, point: [f64; 2]) -> bool {
        self.plan.outlines.iter().all(|(outline, origin)| {
            outline.depth([point[0] - origin[0], point[1] - origin[1]]) >= 0.0
        })
    }
}

impl Cell {
    /// Force on one ring, N.
    fn ring_force(&self, ring: usize, forces: &[f64]) -> f64 {
        (self.rings.columns.first_patch[ring]..self.rings.columns.first_patch[ring + 1])
            .map(|patch| {
                self.rings.columns.patch_area[patch] * self.patches.pressure(patch, forces)
            })
            .sum()
    }
}
