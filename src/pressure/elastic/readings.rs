//! What an engineer reads off a field: forces, radii, peaks, gaps.

use crate::{
    numerics::columns::{Plan, Region},
    pressure::elastic::{FaceField, Field, MeshFace},
};

/// Share of a column's cells that must be faying area for its pressure to mean anything.
const SLIVER: f64 = 0.5;

impl Field {
    /// Force carried by the first interface, N.
    pub fn force(&self) -> f64 {
        self.faces[0].force()
    }

    /// Force of the first interface's columns that are nearer to this bolt than to any other, N.
    pub fn force_of(&self, bolt: usize) -> f64 {
        self.face(0).force_of(bolt)
    }

    /// Area in contact at the first interface, m²; converges slowly.
    pub fn contact_area(&self) -> f64 {
        self.face(0).contact_area()
    }

    /// Peak pressure at the first interface, Pa.
    pub fn peak_pressure(&self) -> f64 {
        self.face(0).peak_pressure()
    }

    /// Largest gap at the first interface, m.
    pub fn gap_max(&self) -> f64 {
        self.face(0).gap_max()
    }

    /// Mean gap of the first interface over the whole overlap without holes, m; 0 in contact.
    pub fn gap_mean(&self) -> f64 {
        self.face(0).gap_mean()
    }

    /// Distance from the nearest bolt axis inside which a share of the first interface's force is
    /// carried, m.
    pub fn radius_holding(&self, share: f64) -> f64 {
        self.face(0).radius_holding(share)
    }

    /// Mean distance of the first interface's force from the nearest bolt axis, m.
    pub fn mean_force_radius(&self) -> f64 {
        self.face(0).mean_force_radius()
    }

    /// Pressure of the first interface at a point, Pa; none where there is no faying area.
    pub fn pressure_at(&self, point: [f64; 2]) -> Option<f64> {
        self.face(0).pressure_at(point)
    }

    /// Gap of the first interface at a point, m; none in holes and off the overlap.
    pub fn gap_at(&self, point: [f64; 2]) -> Option<f64> {
        self.face(0).gap_at(point)
    }

    /// Force of the first interface between two distances from a bolt axis, N.
    pub fn ring_force(&self, bolt: usize, radii: [f64; 2]) -> f64 {
        self.face(0).ring_force(bolt, radii)
    }

    /// One interface with all its readings, the uppermost being 0.
    pub fn face(&self, interface: usize) -> Face<'_> {
        Face {
            field: self,
            values: &self.faces[interface],
            shape: &self.mesh.faces[interface],
        }
    }
}

/// One interface of a field.
#[derive(Clone, Copy, Debug)]
pub struct Face<'a> {
    field: &'a Field,
    values: &'a FaceField,
    shape: &'a MeshFace,
}

impl Face<'_> {
    fn plan(&self) -> &Plan {
        &self.field.mesh.plan
    }

    /// Index of the nearest bolt and the distance from its axis.
    fn nearest_bolt(&self, [x, y]: [f64; 2]) -> (usize, f64) {
        let distances = self.field.bolts.iter().enumerate();
        distances
            .map(|(bolt, place)| (bolt, (x - place.at[0]).hypot(y - place.at[1])))
            .min_by(|a, b| a.1.total_cmp(&b.1))
            .unwrap_or((0, 0.0))
    }

    /// Force of the columns that are nearer to this bolt than to any other, N.
    pub fn force_of(&self, bolt: usize) -> f64 {
        (0..self.plan().columns())
            .filter(|column| self.nearest_bolt(self.plan().place(*column)).0 == bolt)
            .map(|column| self.values.weight[column] * self.values.pressure[column])
            .sum()
    }

    /// Area of the columns that touch, m².
    pub fn contact_area(&self) -> f64 {
        let pairs = self.values.weight.iter().zip(&self.values.pressure);
        pairs
            .filter(|(_, pressure)| **pressure > 0.0)
            .map(|(weight, _)| weight)
            .sum()
    }

    /// Whether a column holds enough faying area for its pressure to mean anything.
    fn is_full(&self, column: usize) -> bool {
        self.values.weight[column] >= SLIVER * self.values.full_weight[column]
            && self.values.full_weight[column] > 0.0
    }

    /// Largest pressure of all columns that are no slivers, Pa.
    pub fn peak_pressure(&self) -> f64 {
        (0..self.plan().columns())
            .filter(|column| self.is_full(*column))
            .map(|column| self.values.pressure[column])
            .fold(0.0, f64::max)
    }

    /// Pressures with slivers filled from their neighbours, Pa: for drawings and readings at points.
    pub fn shown_pressure(&self) -> Vec<f64> {
        let ny = self.plan().y.len();
        let filled = |column: usize| {
            let (i, j) = (column / ny, column % ny);
            let around = (i.saturating_sub(1)..=(i + 1).min(self.plan().x.len() - 1))
                .flat_map(|i| (j.saturating_sub(1)..=(j + 1).min(ny - 1)).map(move |j| i * ny + j));
            let full: Vec<f64> = around
                .filter(|other| self.is_full(*other))
                .map(|other| self.values.pressure[other])
                .collect();
            if full.is_empty() {
                0.0
            } else {
                full.iter().sum::<f64>() / full.len() as f64
            }
        };
        (0..self.plan().columns())
            .map(|column| {
                if self.is_full(column) {
                    self.values.pressure[column]
                } else {
                    filled(column)
                }
            })
            .collect()
    }

    /// Largest gap between faying faces of all columns that are no slivers, m.
    pub fn faying_gap_max(&self) -> f64 {
        (0..self.plan().columns())
            .filter(|column| self.is_full(*column))
            .map(|column| self.values.gap[column])
            .fold(0.0, f64::max)
    }

    /// Largest gap, beside feet included, m.
    pub fn gap_max(&self) -> f64 {
        let open = self.values.open_gap.iter().copied();
        open.fold(self.faying_gap_max(), f64::max)
    }

    /// Mean gap over the whole overlap without holes, m; contact counts as 0.
    pub fn gap_mean(&self) -> f64 {
        let sum = |weights: &[f64], values: &[f64]| -> f64 {
            weights.iter().zip(values).map(|(w, v)| w * v).sum()
        };
        let values = self.values;
        let area: f64 = values.weight.iter().chain(&values.open_weight).sum();
        (sum(&values.weight, &values.gap) + sum(&values.open_weight, &values.open_gap)) / area
    }

    /// Calls `visit` with place and force of every sample of the faying area under pressure.
    fn each_force(&self, mut visit: impl FnMut([f64; 2], f64)) {
        for cell in 0..self.plan().cells() {
            let pressures = self
                .plan()
                .corners(cell)
                .map(|column| self.values.pressure[column]);
            if pressures.iter().all(|pressure| *pressure == 0.0) {
                continue;
            }
            let [x, y] = self.plan().cell_sides(cell);
            self.shape
                .contact
                .each_sample(self.plan(), cell, |place, area| {
                    let s = (place[0] - x[0]) / (x[1] - x[0]);
                    let t = (place[1] - y[0]) / (y[1] - y[0]);
                    let [a, b, c, d] = pressures;
                    let pressure =
                        (1.0 - s) * ((1.0 - t) * a + t * b) + s * ((1.0 - t) * c + t * d);
                    visit(place, pressure * area);
                });
        }
    }

    /// Force between two distances from a bolt axis, N.
    pub fn ring_force(&self, bolt: usize, [inner, outer]: [f64; 2]) -> f64 {
        let axis = self.field.bolts[bolt].at;
        let mut sum = 0.0;
        self.each_force(|[x, y], force| {
            let distance = (x - axis[0]).hypot(y - axis[1]);
            if inner <= distance && distance < outer {
                sum += force;
            }
        });
        sum
    }

    /// Mean distance of the force from the nearest bolt axis, m.
    ///
    /// Forces stand on their columns, where the bodies feel them.
    pub fn mean_force_radius(&self) -> f64 {
        let (mut moment, mut whole) = (0.0, 0.0);
        for column in 0..self.plan().columns() {
            let force = self.values.weight[column] * self.values.pressure[column];
            if force > 0.0 {
                moment += force * self.nearest_bolt(self.plan().place(column)).1;
                whole += force;
            }
        }
        moment / whole
    }

    /// Distance from the nearest bolt axis inside which a share of the force is carried, m.
    pub fn radius_holding(&self, share: f64) -> f64 {
        let mut forces = Vec::new();
        self.each_force(|place, force| forces.push((self.nearest_bolt(place).1, force)));
        forces.sort_by(|a, b| a.0.total_cmp(&b.0));
        let wanted = share * forces.iter().map(|(_, force)| force).sum::<f64>();
        let mut carried = 0.0;
        for (distance, force) in &forces {
            carried += force;
            if carried >= wanted {
                return *distance;
            }
        }
        forces.last().map_or(0.0, |(distance, _)| *distance)
    }

    /// Pressure at a point, Pa; none where there is no faying area.
    pub fn pressure_at(&self, point: [f64; 2]) -> Option<f64> {
        self.at(&self.shape.contact, &self.values.pressure, point)
    }

    /// Gap at a point, beside feet too, m; none in holes and off the overlap.
    pub fn gap_at(&self, point: [f64; 2]) -> Option<f64> {
        self.at(&self.shape.contact, &self.values.gap, point)
            .or_else(|| self.at(&self.shape.beside, &self.values.open_gap, point))
    }

    fn at(&self, region: &Region, values: &[f64], point: [f64; 2]) -> Option<f64> {
        if !region.holds(self.plan(), point) {
            return None;
        }
        let around = self.plan().around(point)?;
        Some(
            around
                .iter()
                .map(|(column, weight)| weight * values[*column])
                .sum(),
        )
    }
}
