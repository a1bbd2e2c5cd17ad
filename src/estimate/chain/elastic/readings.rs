//! What an engineer reads off a solved field: pressures, gaps, rings, what becomes of a bow.

use crate::{
    estimate::{
        Chain, ConeBeside, Failure, Flatness, Meeting, PressureResult, Realisation, RingRow,
        SolvedField, SolverHealth,
        chain::{
            PressedEdge,
            elastic::{
                Case, ElasticModel, GROUND,
                heat::{Conductances, Factors, conductances},
                variant::{Variant, loose_flatness},
            },
        },
    },
    joint::Joint,
    numerics::columns::{Plan, Region},
    pressure::elastic::{FaceField, Field},
};

/// Rings across the seat of a head, from hole to bearing radius.
const RINGS_UNDER_HEAD: f64 = 8.0;
/// Growth of the rings' width beyond two bearing radii.
const RING_GROWTH: f64 = 1.2;

/// Mean pressure as the force meets it, Pa: `∫ p² dA/∫ p dA` over columns that are no slivers.
pub(super) fn mean_pressure(field: &Field) -> f64 {
    let face = &field.faces[0];
    let (mut square, mut force) = (0.0, 0.0);
    for (column, pressure) in face.pressure.iter().enumerate() {
        if face.weight[column] >= 0.5 * face.full_weight[column] {
            square += face.weight[column] * pressure * pressure;
            force += face.weight[column] * pressure;
        }
    }
    if force > 0.0 { square / force } else { 0.0 }
}

/// Widest gap between faying faces, what lies beside feet left out, m.
fn widest(field: &Field) -> f64 {
    let gaps = field.faces.iter().flat_map(|face| face.gap.iter().copied());
    gaps.fold(0.0, f64::max)
}

impl ElasticModel {
    /// The pressure field of a case at nominal.
    pub(in crate::estimate::chain) fn pressure(
        &self,
        chain: &Chain,
        case: usize,
    ) -> Result<PressureResult, Failure> {
        let index = case;
        let case = &self.cases[index];
        let field = &case.field;
        let health = &field.health;
        Ok(PressureResult {
            peak: field.peak_pressure(),
            contact_area: field.contact_area(),
            radius_95: field.radius_holding(0.95),
            force: field.force(),
            gap_max: Some(field.gap_max()),
            gap_mean: Some(field.gap_mean()),
            solved: Some(SolvedField {
                mean_force_radius: field.mean_force_radius(),
                flatness: self.flatness(chain, case)?,
                cone: cone_beside(chain, index)?,
                health: SolverHealth {
                    unknowns: health.unknowns,
                    steps: health.newton_steps,
                    rounds: health.cg_iterations,
                    force_balance: health.force_balance,
                    complementarity: health.complementarity,
                    energy_fell: health.energy_rise <= ENERGY_NOISE,
                    residual: health.residual,
                    heat_balance: case.heat.health.balance,
                },
            }),
        })
    }

    /// What becomes of bow, map, sag or stated flatness under the bolts.
    ///
    /// Flat and bent faces are solved on the ground level; the ratio of its widest gap to that of
    /// the finer field carries them over.
    fn flatness(&self, chain: &Chain, case: &Case) -> Result<Flatness, Failure> {
        let joint = chain.joint();
        let left = widest(&case.field);
        let height: f64 = joint.plates.iter().map(loose_flatness).sum();
        if joint.is_flat() && height <= 0.0 {
            return Ok(Flatness::Flat);
        }
        let ground = |variant: Variant| {
            let field = self
                .bank
                .field(joint, (GROUND, variant), &case.conditions.forces)?;
            Ok::<f64, Failure>(widest(&field))
        };
        let carried = left / ground(Variant::Stated)?;
        if joint.is_flat() {
            return Ok(Flatness::Stated {
                height,
                left: [
                    carried * ground(Variant::Bent(-1.0))?,
                    carried * ground(Variant::Bent(1.0))?,
                ],
                flat: left,
            });
        }
        Ok(Flatness::Known {
            initial: initial(joint, &case.field),
            left,
            flat: carried * ground(Variant::Flat)?,
        })
    }

    /// How the faces meet at a point.
    pub(in crate::estimate::chain) fn met_at(
        &self,
        case: usize,
        point: [f64; 2],
    ) -> Option<Meeting> {
        let case = &self.cases[case];
        let field = &case.field;
        let shape = &field.mesh.faces[0];
        let plan = &field.mesh.plan;
        let gap = field.gap_at(point)?;
        let pressure = if shape.contact.holds(plan, point) {
            let shown = case.shown.get_or_init(|| field.face(0).shown_pressure());
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
    pub(in crate::estimate::chain) fn contact_radius(&self, case: usize, bolt: usize) -> f64 {
        let field = &self.cases[case].field;
        let face = &field.faces[0];
        let area: f64 = (0..face.weight.len())
            .filter(|column| face.pressure[*column] > 0.0)
            .filter(|column| nearest(field, field.mesh.plan.place(*column)).0 == bolt)
            .map(|column| face.weight[column])
            .sum();
        let hole = field.bolts[bolt].hole_radius;
        (area / std::f64::consts::PI + hole * hole).sqrt()
    }

    /// Where the contact reaches an edge of the faying faces of plates or feet, holes not looked at;
    /// the place of the highest pressure there.
    ///
    /// A column stands at an edge when a step to a neighbouring line leaves plate or foot.
    pub(in crate::estimate::chain) fn pressed_edge(
        &self,
        joint: &Joint,
        case: usize,
    ) -> Option<PressedEdge> {
        let field = &self.cases[case].field;
        let (plan, face) = (&field.mesh.plan, &field.faces[0]);
        let floor = EDGE_FLOOR * field.peak_pressure();
        let meets = |point: [f64; 2]| {
            let mut plates = joint.plates.iter();
            plates.all(|plate| plate.covers(point) && plate.stands_at(point))
        };
        let beside = |lines: &[f64], at: usize| {
            let step = |to: Option<&f64>| to.map_or(f64::INFINITY, |line| (line - lines[at]).abs());
            let width = step(lines.get(at + 1)).min(step(lines.get(at.wrapping_sub(1))));
            [lines[at] - 0.99 * width, lines[at] + 0.99 * width]
        };
        let at_edge = |column: usize| {
            let [i, j] = [column / plan.y.len(), column % plan.y.len()];
            let (xs, ys) = (beside(&plan.x, i), beside(&plan.y, j));
            let [x, y] = plan.place(column);
            xs.iter().any(|x| !meets([*x, y])) || ys.iter().any(|y| !meets([x, *y]))
        };
        (0..face.weight.len())
            .filter(|column| face.pressure[*column] > floor)
            .filter(|column| face.weight[*column] >= 0.5 * face.full_weight[*column])
            .filter(|column| at_edge(*column))
            .max_by(|one, other| face.pressure[*one].total_cmp(&face.pressure[*other]))
            .map(|column| PressedEdge {
                at: plan.place(column),
                pressure: face.pressure[column],
            })
    }

    /// Area of the faying faces, beside feet included, m².
    pub(in crate::estimate::chain) fn footprint(&self) -> f64 {
        let face = &self.cases[0].field.faces[0];
        face.weight.iter().chain(&face.open_weight).sum()
    }

    /// The rings around a bolt at nominal: every sample of the faces counts to its nearest bolt.
    pub(in crate::estimate::chain) fn rings(&self, case: usize, bolt: usize) -> Vec<RingRow> {
        let case = &self.cases[case];
        let field = &case.field;
        let faces = conductances(field, self.bank.order, (&case.conditions, &Factors::NONE));
        let edges = edges(field, bolt);
        let mut sums = vec![[0.0; 3]; edges.len() - 1];
        for (region, values) in parts(field, &faces) {
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
                sums[ring][0] += area;
                sums[ring][1] += area * values.pressure.map_or(0.0, at);
                sums[ring][2] += area * at(values.conductance);
            });
        }
        let mut cumulative = 0.0;
        edges
            .windows(2)
            .zip(sums)
            .filter(|(_, [area, ..])| *area > 0.0)
            .map(|(pair, [area, force, share])| {
                cumulative += share;
                RingRow {
                    radius: [pair[0], pair[1]],
                    area,
                    pressure: force / area,
                    conductance: share / area,
                    share,
                    cumulative,
                }
            })
            .collect()
    }
}

/// Share of the peak pressure below which an edge counts as free.
const EDGE_FLOOR: f64 = 0.01;

/// Rise of the energy that is rounding and no rise.
const ENERGY_NOISE: f64 = 1e-9;

/// Values of one part of the faces at the columns.
struct Values<'a> {
    pressure: Option<&'a [f64]>,
    conductance: &'a [f64],
}

/// The touching part of the first interface, and what lies beside feet.
fn parts<'a>(field: &'a Field, faces: &'a Conductances) -> Vec<(&'a Region, Values<'a>)> {
    let shape = &field.mesh.faces[0];
    let face: &FaceField = &field.faces[0];
    let mut found = vec![(
        &shape.contact,
        Values {
            pressure: Some(&face.pressure),
            conductance: &faces[0][0],
        },
    )];
    if let Some(beside) = faces[0].get(1) {
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

/// Edges of rings around a bolt, from its hole to the far end of the plan, m.
fn edges(field: &Field, bolt: usize) -> Vec<f64> {
    let place = &field.bolts[bolt];
    let plan = &field.mesh.plan;
    let far = |lines: &[f64], at: f64| {
        (lines[lines.len() - 1] - at)
            .abs()
            .max((at - lines[0]).abs())
    };
    let end = far(&plan.x, place.at[0]).hypot(far(&plan.y, place.at[1]));
    let mut width = (place.bearing_radius - place.hole_radius) / RINGS_UNDER_HEAD;
    let mut edges = vec![place.hole_radius];
    let mut edge = place.hole_radius;
    while edge < end {
        edge += width;
        edges.push(edge);
        if edge > 2.0 * place.bearing_radius {
            width *= RING_GROWTH;
        }
    }
    edges
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
fn initial(joint: &Joint, field: &Field) -> f64 {
    let face = &field.faces[0];
    let gaps = (0..face.weight.len())
        .filter(|column| face.weight[*column] > 0.0)
        .map(|column| joint.initial_gap(field.mesh.plan.place(column)));
    let (low, high) = gaps.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), gap| {
        (low.min(gap), high.max(gap))
    });
    (high - low).max(0.0)
}

/// The cone's answer at the same nominal inputs; none where it cannot carry the joint.
fn cone_beside(chain: &Chain, case: usize) -> Result<Option<ConeBeside>, Failure> {
    let joint = chain.joint();
    if !joint.needs_elastic().is_empty() {
        return Ok(None);
    }
    let cone = Chain::new(joint)?;
    let state = cone.state(case, &Realisation::default())?;
    Ok(Some(ConeBeside {
        radius_95: cone.pressure(case, &state)?.radius_95,
        contact: state.path.contact.recip(),
        source_to_sink: state.path.source_to_sink,
    }))
}
