//! What an engineer reads off a field on columns: pressures, gaps, rings.

use crate::{
    estimate::{
        ConeBeside, FacePoint, Flatness, InterfaceResult, Meeting, PressureResult, RingRow,
        SolvedField, SolverHealth, Temperatures,
        chain::{
            PressedEdge,
            elastic::{
                columns::{
                    OnColumns, edges::pressed_edge, heat::Conductances, problem::Order,
                    temperatures,
                },
                rings::{Sum, edges, rows},
                solver::{Met, Solved},
            },
        },
    },
    joint::Joint,
    numerics::columns::{Plan, Region},
    pressure::elastic::{FaceField, Field},
    resistance::{
        Path,
        columns::{Across, Heat, Section},
    },
};

/// Rise of the energy that is rounding and no rise.
const ENERGY_NOISE: f64 = 1e-9;

/// Widest gap between faying faces, what lies beside feet left out, m.
pub(super) fn widest(field: &Field) -> f64 {
    (0..field.faces.len())
        .map(|interface| field.face(interface).faying_gap_max())
        .fold(0.0, f64::max)
}

impl OnColumns {
    /// Index in the field of an interface of the joint: the field counts from the heads.
    fn own(&self, interface: usize) -> usize {
        self.order.plate(interface, self.field.faces.len())
    }
}

/// Mean pressure as the force meets it over columns that are no slivers, Pa: `∫ p² dA/∫ p dA`.
fn mean_pressure(face: &FaceField) -> f64 {
    let (mut square, mut force) = (0.0, 0.0);
    for (column, pressure) in face.pressure.iter().enumerate() {
        if face.weight[column] >= 0.5 * face.full_weight[column] {
            square += face.weight[column] * pressure * pressure;
            force += face.weight[column] * pressure;
        }
    }
    if force > 0.0 { square / force } else { 0.0 }
}

/// `∫ q²/h dA` over what touches and over what is parted of every interface, warm one first, K/W:
/// by so much the resistance falls when the conductance there rises, relative to the rise.
pub(super) fn shares(
    (field, order): (&Field, Order),
    heat: &Heat,
    conductances: &Conductances,
) -> Vec<[f64; 2]> {
    let interfaces = heat.flux.iter().zip(conductances).enumerate();
    interfaces
        .map(|(interface, (fluxes, conductances))| {
            let face = &field.faces[order.plate(interface, field.faces.len())];
            let mut shares = [0.0; 2];
            let areas = [&face.weight, &face.open_weight];
            for (part, (flux, conductance)) in fluxes.iter().zip(conductances).enumerate() {
                for (column, (flux, conductance)) in flux.iter().zip(conductance).enumerate() {
                    if *conductance > 0.0 {
                        let touches = part == 0 && face.pressure[column] > 0.0;
                        shares[usize::from(!touches)] +=
                            areas[part][column] * flux * flux / conductance;
                    }
                }
            }
            shares
        })
        .collect()
}

impl Solved for OnColumns {
    fn path(&self) -> &Path {
        &self.path
    }

    fn met(&self) -> Vec<Met> {
        let shares = self.shares.iter().enumerate();
        shares
            .map(|(interface, shares)| Met {
                pressure: mean_pressure(&self.field.faces[self.own(interface)]),
                gap: self.field.face(self.own(interface)).gap_mean(),
                shares: *shares,
            })
            .collect()
    }

    fn interfaces(&self, joint: &Joint) -> Vec<InterfaceResult> {
        (0..joint.interfaces())
            .map(|interface| {
                let face = self.field.face(self.own(interface));
                InterfaceResult {
                    plates: joint.meeting(interface).map(|plate| plate.name.clone()),
                    contact: self.heat.contact_per_interface[interface],
                    force: self.field.faces[self.own(interface)].force(),
                    peak: face.peak_pressure(),
                    contact_area: face.contact_area(),
                    gap_max: Some(face.gap_max()),
                    drop: self.heat.interface_drops[interface],
                }
            })
            .collect()
    }

    fn pressure(&self, flatness: Flatness, cone: Option<ConeBeside>) -> PressureResult {
        let health = &self.field.health;
        let face = self.field.face(self.own(0));
        PressureResult {
            peak: face.peak_pressure(),
            contact_area: face.contact_area(),
            radius_95: face.radius_holding(0.95),
            force: self.field.faces[self.own(0)].force(),
            gap_max: Some(face.gap_max()),
            gap_mean: Some(face.gap_mean()),
            solved: Some(SolvedField {
                mean_force_radius: face.mean_force_radius(),
                flatness,
                cone,
                health: SolverHealth {
                    unknowns: health.unknowns,
                    steps: health.newton_steps,
                    rounds: health.cg_iterations,
                    force_balance: health.force_balance,
                    complementarity: health.complementarity,
                    energy_fell: Some(health.energy_rise <= ENERGY_NOISE),
                    residual: Some(health.residual),
                    heat_balance: self.heat.health.balance,
                },
            }),
        }
    }

    /// That of narrow zones alone: the level moves the grid of contact and heat alike.
    fn heat_error(&self) -> f64 {
        self.left_out / self.path.source_to_sink
    }

    fn left_out(&self) -> f64 {
        self.left_out
    }

    fn pressed_edge(&self, joint: &Joint) -> Option<PressedEdge> {
        let field: &Field = &self.field;
        (0..joint.interfaces())
            .filter_map(|interface| pressed_edge((joint, interface), (field, self.order)))
            .reduce(|one, other| {
                if other.pressure > one.pressure {
                    other
                } else {
                    one
                }
            })
    }

    fn met_at(&self, (point, interface): ([f64; 2], usize)) -> Option<Meeting> {
        let field = &self.field;
        let own = self.own(interface);
        let shape = &field.mesh.faces[own];
        let plan = &field.mesh.plan;
        let gap = field.face(own).gap_at(point)?;
        let pressure = if shape.contact.holds(plan, point) {
            let shown = self.shown[own].get_or_init(|| field.face(own).shown_pressure());
            let around = plan.around(point)?;
            around
                .iter()
                .map(|(column, weight)| weight * shown[*column])
                .sum()
        } else {
            0.0
        };
        Some(Meeting {
            pressure,
            gap: Some(if pressure > 0.0 { 0.0 } else { gap }),
        })
    }

    /// Radius of the disc that has the area in contact around a bolt, hole included, m.
    fn contact_radius(&self, bolt: usize) -> f64 {
        let field = &self.field;
        let face = &field.faces[self.own(0)];
        let area: f64 = (0..face.weight.len())
            .filter(|column| face.pressure[*column] > 0.0)
            .filter(|column| nearest(field, field.mesh.plan.place(*column)).0 == bolt)
            .map(|column| face.weight[column])
            .sum();
        let hole = field.bolts[bolt].hole_radius;
        (area / std::f64::consts::PI + hole * hole).sqrt()
    }

    /// Beside feet included.
    fn footprint(&self) -> f64 {
        let face = &self.field.faces[self.own(0)];
        face.weight.iter().chain(&face.open_weight).sum()
    }

    fn temperatures(&self) -> Temperatures {
        temperatures::at_a_glance(&self.heat)
    }

    fn face_points(&self, points: &[[f64; 2]], interface: usize) -> Vec<Option<FacePoint>> {
        let shape = &self.field.mesh.faces[self.own(interface)];
        temperatures::face_points((shape, &self.heat), points, interface)
    }

    fn section(&self, across: Across) -> Option<Vec<Section>> {
        temperatures::section(&self.heat, across)
    }

    /// Every sample of the faces counts to its nearest bolt.
    fn rings(&self, interface: usize) -> Vec<Vec<RingRow>> {
        let field = &self.field;
        let around = field.bolts.iter().enumerate().map(|(bolt, place)| {
            let edges = edges(
                place.hole_radius,
                place.bearing_radius,
                far_end(field, bolt),
            );
            let sums = vec![Sum::default(); edges.len() - 1];
            (edges, sums)
        });
        let mut around: Vec<(Vec<f64>, Vec<Sum>)> = around.collect();
        for (region, values) in parts((field, self.own(interface)), &self.faces[interface]) {
            gather(field, region, |place, area, columns| {
                let (owner, distance) = nearest(field, place);
                let (edges, sums) = &mut around[owner];
                let ring = edges[1..edges.len() - 1].partition_point(|edge| *edge <= distance);
                let at = |values: &[f64]| -> f64 {
                    columns
                        .iter()
                        .map(|(column, weight)| weight * values[*column])
                        .sum()
                };
                let sum = &mut sums[ring];
                sum.area += area;
                sum.force += area * values.pressure.map_or(0.0, at);
                sum.conductance += area * at(values.conductance);
            });
        }
        around
            .iter()
            .map(|(edges, sums)| rows(edges, sums))
            .collect()
    }
}

/// Values of one part of the faces at the columns.
struct Values<'a> {
    pressure: Option<&'a [f64]>,
    conductance: &'a [f64],
}

/// The touching part of an interface, and what lies beside feet.
fn parts<'a>(
    (field, own): (&'a Field, usize),
    faces: &'a [Vec<f64>],
) -> Vec<(&'a Region, Values<'a>)> {
    let shape = &field.mesh.faces[own];
    let face: &FaceField = &field.faces[own];
    let mut found = vec![(
        &shape.contact,
        Values {
            pressure: Some(&face.pressure),
            conductance: &faces[0],
        },
    )];
    if let Some(beside) = faces.get(1) {
        found.push((
            &shape.beside,
            Values {
                pressure: None,
                conductance: beside,
            },
        ));
    }
    found
}

/// Calls `visit` with place, area and surrounding columns of every sample of a region.
fn gather(
    field: &Field,
    region: &Region,
    mut visit: impl FnMut([f64; 2], f64, &[(usize, f64); 4]),
) {
    let plan: &Plan = &field.mesh.plan;
    for cell in 0..plan.cells() {
        region.each_sample(plan, cell, |place, area| {
            if let Some(around) = plan.around(place) {
                visit(place, area, &around);
            }
        });
    }
}

/// Distance from a bolt to the far end of the plan, m.
fn far_end(field: &Field, bolt: usize) -> f64 {
    let [x, y] = field.bolts[bolt].at;
    let plan = &field.mesh.plan;
    let far = |lines: &[f64], at: f64| {
        (lines[lines.len() - 1] - at)
            .abs()
            .max((at - lines[0]).abs())
    };
    far(&plan.x, x).hypot(far(&plan.y, y))
}

/// Index of the nearest bolt and the distance from its axis, m.
fn nearest(field: &Field, [x, y]: [f64; 2]) -> (usize, f64) {
    let distances = field.bolts.iter().enumerate();
    distances
        .map(|(bolt, place)| (bolt, (x - place.at[0]).hypot(y - place.at[1])))
        .min_by(|one, other| one.1.total_cmp(&other.1))
        .unwrap_or((0, 0.0))
}

/// Widest initial gap over the faying faces of any interface, each counted from its first point of
/// contact, m.
pub(super) fn initial(joint: &Joint, (field, order): (&Field, Order)) -> f64 {
    let widest = |interface: usize| {
        let face = &field.faces[order.plate(interface, field.faces.len())];
        let gaps = (0..face.weight.len())
            .filter(|column| face.weight[*column] > 0.0)
            .map(|column| joint.initial_gap(interface, field.mesh.plan.place(column)));
        let (low, high) = gaps.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), gap| {
            (low.min(gap), high.max(gap))
        });
        (high - low).max(0.0)
    };
    (0..joint.interfaces()).map(widest).fold(0.0, f64::max)
}
