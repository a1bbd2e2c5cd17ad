//! What a heat solution tells: resistances between planes, temperatures, and how good they are.

use crate::{
    numerics::elements::edge_points,
    resistance::{
        path::Path,
        round::{
            Condensed, Pair,
            join::{Fields, Meeting},
            plate::{Plate, weighted},
        },
    },
};

/// Heat through a round pair, per watt; temperatures above the mean sink surface, K/W.
#[derive(Clone, Debug, PartialEq)]
pub struct Heat {
    /// Resistances between the planes; bounds for the conductance used.
    pub path: Path,
    /// Source to sink with perfect contact inside the contact radius and none beyond.
    pub perfect_in_zone: f64,
    /// Where the path is hottest.
    pub hottest_at: Place,
    /// Mean over the volume of both plates.
    pub plate_mean: [f64; 2],
    /// Temperatures of the four faces; empty where no heat flows.
    pub profiles: Profiles,
    /// Temperatures inside both plates; empty where no heat flows.
    pub meridians: [Meridian; 2],
    /// How good the solution is.
    pub health: Health,
}

/// A place in the first plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Distance from the axis, m.
    pub radius: f64,
    /// Height above the interface, m.
    pub height: f64,
}

/// Temperatures along a face.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Profile {
    /// Radii, m, rising.
    pub radii: Vec<f64>,
    /// Temperatures there, K/W.
    pub temperatures: Vec<f64>,
}

/// The faces of both plates.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Profiles {
    /// Faces at the interface, first and second plate.
    pub inner: [Profile; 2],
    /// Outer faces: where heat may enter, and the back.
    pub outer: [Profile; 2],
}

/// Temperatures of one plate over radius and height.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Meridian {
    /// Radii of the grid lines, m, rising.
    pub radii: Vec<f64>,
    /// Heights above the interface, m, rising away from it.
    pub heights: Vec<f64>,
    /// For every radius the temperature at every height, K/W.
    pub temperatures: Vec<Vec<f64>>,
}

/// What a solution must satisfy, measured on it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Health {
    /// Largest difference between heat in, across and out, over the heat.
    pub heat_balance: f64,
    /// Source to sink on a grid of twice the spacing over that on the grid used, less 1.
    ///
    /// The error left on the grid used is a fraction of it.
    pub coarser_grid: f64,
    /// Unknown temperatures on the grid used.
    pub unknowns: usize,
}

/// Readings of one solution before they are brought to one watt.
struct Readings {
    heat: f64,
    source: f64,
    sink: f64,
}

impl Pair {
    /// Source to sink, K/W.
    pub(super) fn source_to_sink(&self, meeting: &Meeting) -> f64 {
        match meeting {
            Meeting::Blocked => f64::INFINITY,
            Meeting::Shorted => 0.0,
            Meeting::Flowing(fields) => {
                let readings = Readings::of(self, fields);
                (readings.source - readings.sink) / readings.heat
            }
        }
    }
}

impl Readings {
    fn of(pair: &Pair, fields: &Fields) -> Self {
        let [first, second] = &pair.plates;
        Self {
            heat: fields.heat[0],
            source: if first.anchored {
                1.0
            } else {
                fields.base[0] + weighted(&first.patch_mean, &fields.theta[0])
            },
            sink: if second.anchored {
                0.0
            } else {
                fields.base[1] + weighted(&second.patch_mean, &fields.theta[1])
            },
        }
    }
}

impl Condensed {
    pub(super) fn heat(
        &self,
        fine: &Meeting,
        coarse: &Meeting,
        conductance: &impl Fn(f64) -> f64,
    ) -> Heat {
        let contact = self.contact(conductance);
        let mut path = Path {
            contact,
            contact_per_bolt: vec![contact],
            source_to_sink: self.fine.source_to_sink(fine),
            coolant_drop: self.coolant_drop(),
            perfect_contact: self.perfect,
            added_by_joint: 0.0,
            node_to_node: f64::INFINITY,
            interface_drop: f64::INFINITY,
            hottest: f64::INFINITY,
            resistance_lower: self.lower(contact),
            resistance_upper: self.upper(conductance),
        };
        path.added_by_joint = path.source_to_sink - path.perfect_contact;
        let mut heat = Heat {
            perfect_in_zone: self.zone,
            hottest_at: Place {
                radius: f64::NAN,
                height: f64::NAN,
            },
            plate_mean: [f64::INFINITY, f64::NAN],
            profiles: Profiles::default(),
            meridians: [Meridian::default(), Meridian::default()],
            health: Health {
                heat_balance: 0.0,
                coarser_grid: 0.0,
                unknowns: self.fine.plates.iter().map(Plate::unknowns).sum(),
            },
            path,
        };
        match fine {
            Meeting::Flowing(fields) => {
                self.tell(fields, &mut heat);
                heat.health.coarser_grid =
                    self.coarse.source_to_sink(coarse) / heat.path.source_to_sink - 1.0;
            }
            Meeting::Blocked => {}
            Meeting::Shorted => {
                heat.path.node_to_node = 0.0;
                heat.path.interface_drop = 0.0;
                heat.path.hottest = 0.0;
            }
        }
        heat
    }

    /// Reads temperatures and balance of heat that flows.
    fn tell(&self, fields: &Fields, heat: &mut Heat) {
        let plates = &self.fine.plates;
        let readings = Readings::of(&self.fine, fields);
        let per_watt = |value: f64| (value - readings.sink) / readings.heat;
        let at =
            |plate: usize, node: usize| per_watt(fields.base[plate] + fields.theta[plate][node]);
        for (plate, solved) in plates.iter().enumerate() {
            let mean: f64 = solved
                .volume_mean
                .iter()
                .zip(&fields.theta[plate])
                .map(|(weight, value)| weight * value)
                .sum();
            heat.plate_mean[plate] = per_watt(fields.base[plate] + mean);
            let profile = |nodes: &[usize]| Profile {
                radii: nodes.iter().map(|node| solved.at[*node][0]).collect(),
                temperatures: nodes.iter().map(|node| at(plate, *node)).collect(),
            };
            heat.profiles.inner[plate] = profile(&solved.foot);
            heat.profiles.outer[plate] = profile(&solved.outer);
            // Every other node of a face stands on a grid line, whose nodes are numbered upwards.
            let lines = || solved.foot.iter().zip(&solved.outer).step_by(2);
            heat.meridians[plate] = Meridian {
                radii: lines().map(|(foot, _)| solved.at[*foot][0]).collect(),
                heights: lines().next().map_or_else(Vec::new, |(foot, top)| {
                    (*foot..=*top).map(|node| solved.at[node][1]).collect()
                }),
                temperatures: lines()
                    .map(|(foot, top)| (*foot..=*top).map(|node| at(plate, node)).collect())
                    .collect(),
            };
        }
        heat.path.node_to_node = heat.plate_mean[0] - heat.plate_mean[1];
        heat.path.interface_drop = self.mean_drop(&fields.drop) / readings.heat;
        heat.path.hottest = f64::NEG_INFINITY;
        for (node, [radius, height]) in plates[0].at.iter().enumerate() {
            let temperature = at(0, node);
            if temperature > heat.path.hottest {
                heat.path.hottest = temperature;
                heat.hottest_at = Place {
                    radius: *radius,
                    height: *height,
                };
            }
        }
        let [entering, across, leaving] = fields.heat;
        let off = (entering - across).abs().max((across - leaving).abs());
        heat.health.heat_balance = off / readings.heat.abs();
    }

    /// Ring sum over the shared face, W/K.
    fn contact(&self, conductance: &impl Fn(f64) -> f64) -> f64 {
        let points = self
            .fine
            .shared
            .iter()
            .flat_map(|radii| edge_points(*radii));
        points
            .map(|point| conductance(point.radius) * point.area)
            .sum()
    }

    fn mean_drop(&self, drop: &[f64]) -> f64 {
        let (mut sum, mut area) = (0.0, 0.0);
        for (column, radii) in self.fine.shared.iter().enumerate() {
            for point in edge_points(*radii) {
                area += point.area;
                let nodes = drop[2 * column..].iter().zip(point.shapes);
                sum += point.area * nodes.map(|(drop, shape)| drop * shape).sum::<f64>();
            }
        }
        sum / area
    }

    fn coolant_drop(&self) -> Option<f64> {
        let film = self.problem.outlet.film()?;
        Some((film * self.fine.plates[1].area).recip())
    }

    /// Whether heat is given, or the temperature held, on the whole outer face or rim.
    pub(super) fn is_heated_all_over(&self) -> bool {
        self.problem.covers(0)
    }
}
