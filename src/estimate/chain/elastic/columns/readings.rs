//! What an engineer reads off a field on columns: pressures, gaps, rings.

use crate::{
    estimate::{
        ConeBeside, FacePoint, Flatness, Meeting, PressureResult, RingRow, SolvedField,
        SolverHealth, Temperatures,
        chain::{
            PressedEdge,
            elastic::{
                columns::{OnColumns, edges::pressed_edge, temperatures},
                rings::{Sum, edges, rows},
                solver::Solved,
            },
        },
    },
    joint::Joint,
    numerics::columns::{Plan, Region},
    pressure::elastic::{FaceField, Field},
    resistance::{
        Path,
        columns::{Across, Section},
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

impl Solved for OnColumns {
    fn path(&self) -> &Path {
        &self.path
    }

    /// Over columns that are no slivers.
    fn mean_pressure(&self) -> f64 {
        let face = &self.field.faces[0];
        let (mut square, mut force) = (0.0, 0.0);
        for (column, pressure) in face.pressure.iter().enumerate() {
            if face.weight[column] >= 0.5 * face.full_weight[column] {
                square += face.weight[column] * pressure * pressure;
                force += face.weight[column] * pressure;
            }
        }
        if force > 0.0 { square / force } else { 0.0 }
    }

    fn gap_mean(&self) -> f64 {
        self.field.gap_mean()
    }

    fn pressure(&self, flatness: Flatness, cone: Option<ConeBeside>) -> PressureResult {
        let field = &self.field;
        let health = &field.health;
        PressureResult {
            peak: field.peak_pressure(),
            contact_area: field.contact_area(),
            radius_95: field.radius_holding(0.95),
            force: field.force(),
            gap_max: Some(field.gap_max()),
            gap_mean: Some(field.gap_mean()),
            solved: Some(SolvedField {
                mean_force_radius: field.mean_force_radius(),
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

    /// None: the level moves the grid of contact and heat alike.
    fn heat_error(&self) -> f64 {
        0.0
    }

    fn pressed_edge(&self, joint: &Joint) -> Option<PressedEdge> {
        pressed_edge(joint, &self.field)
    }

    fn met_at(&self, point: [f64; 2]) -> Option<Meeting> {
        let field = &self.field;
        let shape = &field.mesh.faces[0];
        let plan = &field.mesh.plan;
        let gap = field.gap_at(point)?;
        let pressure = if shape.contact.holds(plan, point) {
            let shown = self.shown.get_or_init(|| field.face(0).shown_pressure());
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
        let face = &field.faces[0];
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
        let face = &self.field.faces[0];
        face.weight.iter().chain(&face.open_weight).sum()
    }

    fn temperatures(&self) -> Temperatures {
        temperatures::at_a_glance(&self.heat)
    }

    fn face_points(&self, points: &[[f64; 2]]) -> Vec<Option<FacePoint>> {
        temperatures::face_points((&self.field, &self.heat), points)
    }

    fn section(&self, across: Across) -> Option<Vec<Section>> {
        temperatures::section(&self.heat, across)
    }

    /// Every sample of the faces counts to its nearest bolt.
    fn rings(&self, bolt: usize) -> Vec<RingRow> {
        let field = &self.field;
        let place = &field.bolts[bolt];
        let edges = edges(
            place.hole_radius,
            place.bearing_radius,
            far_end(field, bolt),
        );
        let mut sums = vec![Sum::default(); edges.len() - 1];
        for (region, values) in parts(field, &self.first) {
            gather(field, region, |place, area, around| {
                let (owner, distance) = nearest(field, place);
                if owner != bolt {
                    return;
                }
                let ring = edges[1..edges.len() - 1].partition_point(|edge| *edge <= distance);
                let at = |values: &[f64]| -> f64 {
                    around
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
        rows(&edges, &sums)
    }
}

/// Values of one part of the faces at the columns.
struct Values<'a> {
    pressure: Option<&'a [f64]>,
    conductance: &'a [f64],
}

/// The touching part of the first interface, and what lies beside feet.
fn parts<'a>(field: &'a Field, first: &'a [Vec<f64>]) -> Vec<(&'a Region, Values<'a>)> {
    let shape = &field.mesh.faces[0];
    let face: &FaceField = &field.faces[0];
    let mut found = vec![(
        &shape.contact,
        Values {
            pressure: Some(&face.pressure),
            conductance: &first[0],
        },
    )];
    if let Some(beside) = first.get(1) {
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

/// Widest initial gap over the faying faces, counted from their first point of contact, m.
pub(super) fn initial(joint: &Joint, field: &Field) -> f64 {
    let face = &field.faces[0];
    let gaps = (0..face.weight.len())
        .filter(|column| face.weight[*column] > 0.0)
        .map(|column| joint.initial_gap(field.mesh.plan.place(column)));
    let (low, high) = gaps.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), gap| {
        (low.min(gap), high.max(gap))
    });
    (high - low).max(0.0)
}
