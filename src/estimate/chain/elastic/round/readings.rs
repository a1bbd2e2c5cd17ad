//! What an engineer reads off a field in round plates: pressures, gaps, rings.

use std::f64::consts::PI;

use crate::{
    estimate::{
        ConeBeside, FacePoint, Flatness, InterfaceResult, Meeting, PressureResult, RingRow,
        SolvedField, SolverHealth, Temperatures,
        chain::{
            PressedEdge,
            elastic::{
                rings::{Sum, edges, rows},
                round::{InRound, shape::Shape, temperatures},
                solver::{Met, Solved},
            },
        },
    },
    joint::Joint,
    numerics::elements::edge_points,
    pressure::round::Solution,
    resistance::{
        Path,
        columns::{Across, Section},
    },
};

impl Solved for InRound {
    fn path(&self) -> &Path {
        &self.heat.path
    }

    fn met(&self) -> Vec<Met> {
        vec![Met {
            pressure: self.contact.mean_pressure(self.force),
            gap: self.contact.gap_mean(self.force),
            shares: [1.0; 2],
        }]
    }

    fn interfaces(&self, joint: &Joint) -> Vec<InterfaceResult> {
        let pressure = self.pressure(Flatness::Flat, None);
        vec![InterfaceResult::only(joint, self.path(), &pressure)]
    }

    fn footprint(&self) -> f64 {
        ring(self.shape.hole_radius, self.shape.rim_radius)
    }

    fn contact_radius(&self, _: usize) -> f64 {
        self.contact.contact_radius
    }

    fn met_at(&self, ([x, y], _): ([f64; 2], usize)) -> Option<Meeting> {
        let radius = (x - self.shape.at[0]).hypot(y - self.shape.at[1]);
        let on_the_faces = self.shape.hole_radius <= radius && radius <= self.shape.rim_radius;
        on_the_faces.then(|| Meeting {
            pressure: self.contact.pressure(radius, self.force),
            gap: Some(self.contact.gap(radius, self.force)),
        })
    }

    fn rings(&self, _: usize) -> Vec<Vec<RingRow>> {
        vec![self.rings.clone()]
    }

    fn temperatures(&self) -> Temperatures {
        temperatures::at_a_glance(&self.heat, &self.shape)
    }

    fn face_points(&self, points: &[[f64; 2]], _: usize) -> Vec<Option<FacePoint>> {
        temperatures::face_points((&self.heat, &self.flux), &self.shape, points)
    }

    fn section(&self, across: Across) -> Option<Vec<Section>> {
        temperatures::section(&self.heat, &self.shape, across)
    }

    fn pressure(&self, flatness: Flatness, cone: Option<ConeBeside>) -> PressureResult {
        let contact = &self.contact;
        PressureResult {
            peak: contact.peak(self.force),
            contact_area: ring(self.shape.hole_radius, contact.contact_radius),
            radius_95: contact.radius_holding(0.95),
            force: self.force * contact.carried_within(self.shape.rim_radius),
            gap_max: Some(contact.gap_max(self.force)),
            gap_mean: Some(contact.gap_mean(self.force)),
            solved: Some(SolvedField {
                mean_force_radius: contact.mean_force_radius(),
                flatness,
                cone,
                health: SolverHealth {
                    unknowns: contact.health.unknowns,
                    steps: contact.health.iterations,
                    rounds: 0,
                    force_balance: contact.health.force_balance,
                    complementarity: breach(contact),
                    energy_fell: None,
                    residual: None,
                    heat_balance: self.heat.health.heat_balance,
                },
            }),
        }
    }

    /// A level moves the grid of the contact alone; the heat holds itself against twice the spacing.
    fn heat_error(&self) -> f64 {
        self.heat.health.coarser_grid.abs()
    }

    /// Contact that fills the plates ends at their rim.
    fn pressed_edge(&self, _: &Joint) -> Option<PressedEdge> {
        let rim = self.shape.rim_radius;
        let pressure = self.contact.pressure(rim * (1.0 - 1e-9), self.force);
        (pressure > 0.0).then_some(PressedEdge {
            at: [self.shape.at[0] + rim, self.shape.at[1]],
            pressure,
        })
    }
}

/// Area between two radii, m².
fn ring(inner: f64, outer: f64) -> f64 {
    PI * (outer * outer - inner * inner)
}

/// Largest pull over the peak pressure, or overlap over the widest gap.
fn breach(contact: &Solution) -> f64 {
    let over = |least: f64, most: f64| {
        if least < 0.0 && most > 0.0 {
            -least / most
        } else {
            0.0
        }
    };
    let health = &contact.health;
    over(health.smallest_pressure_inside, contact.peak(1.0))
        .max(over(health.smallest_gap_outside, contact.gap_max(1.0)))
}

/// The rings of a contact under a clamp force (N) with a local conductance of the radius.
///
/// Summed between the grid lines of the contact, where the pressure is straight.
pub(super) fn rings(
    shape: &Shape,
    (contact, force): (&Solution, f64),
    conductance: impl Fn(f64) -> f64,
) -> Vec<RingRow> {
    let mut edges = edges(shape.hole_radius, shape.bearing_radius, shape.rim_radius);
    if let Some(last) = edges.last_mut() {
        *last = shape.rim_radius;
    }
    let sums: Vec<Sum> = edges
        .windows(2)
        .map(|pair| {
            let (inner, outer) = (pair[0], pair[1]);
            let between = contact.radii.iter().copied();
            let mut lines = vec![inner];
            lines.extend(between.filter(|line| inner < *line && *line < outer));
            lines.push(outer);
            let points = lines
                .windows(2)
                .flat_map(|line| edge_points([line[0], line[1]]));
            let mut sum = Sum {
                area: ring(inner, outer),
                ..Sum::default()
            };
            for point in points {
                sum.force += point.area * contact.pressure(point.radius, force);
                sum.conductance += point.area * conductance(point.radius);
            }
            sum
        })
        .collect();
    rows(&edges, &sums)
}
