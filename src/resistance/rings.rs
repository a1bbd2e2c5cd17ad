//! Rings of one cell and the patches of pressure on them.

use std::{collections::BTreeMap, f64::consts::TAU};

use crate::{
    pressure::Cone,
    resistance::{
        cells::{Cell, Plan, View},
        column::Columns,
        failure::Failure,
        network::{self, Rings},
        region::outside_disc,
    },
};

/// Patches on a whole ring where several bolts press.
const PATCHES_PER_TURN: f64 = 48.0;
/// Areas below this share of their cell are rounding.
const NO_AREA: f64 = 1e-13;

/// Pressure per force on each patch of the faying face.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct Patches {
    /// First weight of each patch, and one past the last weight at the end.
    pub(super) first_weight: Vec<usize>,
    /// Bolt and its pressure over its force, 1/m².
    pub(super) weights: Vec<(usize, f64)>,
}

impl Patches {
    pub(super) fn of(&self, patch: usize) -> &[(usize, f64)] {
        &self.weights[self.first_weight[patch]..self.first_weight[patch + 1]]
    }

    /// Pressure on a patch, Pa.
    pub(super) fn pressure(&self, patch: usize, forces: &[f64]) -> f64 {
        self.of(patch)
            .iter()
            .map(|(bolt, weight)| forces[*bolt] * weight)
            .sum()
    }

    /// Divides the weights by the share of each bolt's force that they carry on patches of the
    /// given areas.
    pub(super) fn restore(&mut self, areas: &[f64], bolts: usize) {
        let mut carried = vec![0.0; bolts];
        for (patch, area) in areas.iter().enumerate() {
            for (bolt, weight) in self.of(patch) {
                carried[*bolt] += area * weight;
            }
        }
        for (bolt, weight) in &mut self.weights {
            *weight /= carried[*bolt];
        }
    }

    pub(super) fn push(&mut self, weights: impl Iterator<Item = (usize, f64)>) {
        self.weights
            .extend(weights.filter(|(_, weight)| *weight > 0.0));
        self.first_weight.push(self.weights.len());
    }
}

/// Divides the weights by the share of its force that each bolt's field carries on the faying
/// faces, and tells the shares.
pub(super) fn restore(cells: &mut [Cell]) -> Result<Vec<f64>, Failure> {
    let mut carried = vec![0.0; cells.len()];
    for cell in cells.iter() {
        for (patch, area) in cell.rings.columns.patch_area.iter().enumerate() {
            for (bolt, weight) in cell.patches.of(patch) {
                carried[*bolt] += area * weight;
            }
        }
    }
    let pressing = |share: &f64| share.is_finite() && *share > 0.0;
    if let Some(bolt) = carried.iter().position(|share| !pressing(share)) {
        return Err(Failure::NoContact {
            bolt,
            network: "its rings",
        });
    }
    for cell in cells {
        for (bolt, weight) in &mut cell.patches.weights {
            *weight /= carried[*bolt];
        }
    }
    Ok(carried)
}

/// Marks each cell with the first one like it.
///
/// Cells that are alike have like areas, so only those of nearly the same area are compared.
pub(super) fn pair_up(cells: &mut [Cell]) {
    // A hundred rings may each differ by what `alike` allows.
    const WINDOW: f64 = 1e-6;
    let mut known: BTreeMap<u64, Vec<usize>> = BTreeMap::new();
    for index in 0..cells.len() {
        let area: f64 = cells[index].rings.columns.plate_area[0].iter().sum();
        // The bits of positive numbers rise as the numbers do.
        let [low, high] = [1.0 - WINDOW, 1.0 + WINDOW].map(|factor| (area * factor).to_bits());
        let first = known
            .range(low..=high)
            .flat_map(|(_, cells)| cells)
            .copied()
            .filter(|first| alike(&cells[*first], &cells[index]))
            .min();
        match first {
            Some(first) => cells[index].like = first,
            None => known.entry(area.to_bits()).or_default().push(index),
        }
    }
}

/// Radii that bound the rings of one cell.
fn edges(plan: &Plan, view: &View, bolt: usize, count: usize) -> Vec<f64> {
    // Rings between the smaller and the larger hole, where only one plate is.
    const BETWEEN_HOLES: u32 = 4;
    let cone = &plan.sites[bolt].cone;
    let [first, second] = plan.sites[bolt].hole_radius;
    let (inner, outer) = (
        first.min(second),
        plan.hole_radius(bolt).max(cone.hole_radius),
    );
    let far = view.plates[0]
        .region
        .farthest()
        .max(view.plates[1].region.farthest());
    let mut edges: Vec<f64> = Vec::with_capacity(count + 1);
    if outer > inner * (1.0 + 1e-9) {
        edges.extend(
            (0..BETWEEN_HOLES)
                .map(|ring| inner + (outer - inner) * f64::from(ring) / f64::from(BETWEEN_HOLES)),
        );
    }
    edges.extend(network::edges(outer, cone.contact_radius, far, count));
    edges
}

/// The rings of one bolt and the pressures on them.
pub(super) fn cell(plan: &Plan, view: &View, bolt: usize) -> Cell {
    let edges = edges(plan, view, bolt, plan.rings);
    let between = |area: &dyn Fn(f64) -> f64| -> Vec<f64> {
        let within: Vec<f64> = edges.iter().map(|radius| area(*radius)).collect();
        let least = NO_AREA * within.last().copied().unwrap_or(0.0);
        within
            .windows(2)
            .map(|pair| pair[1] - pair[0])
            .map(|area| if area > least { area } else { 0.0 })
            .collect()
    };
    let plate_area = [0, 1].map(|k| between(&|radius| view.plates[k].area_within(radius)));
    let interface = between(&|radius| view.interface.area_within(radius));
    let head = under_head(plan.sites[bolt].cone, view, &edges, &interface);
    let head_area: f64 = head.iter().sum();
    let holes = plan.sites[bolt].hole_radius;
    let [(shape1, rim1), (shape2, rim2)] =
        [0, 1].map(|k| network::shapes(holes[k], &edges, &plate_area[k]));
    let mut rings = Rings {
        columns: Columns {
            source_area: between(&|radius| view.source.area_within(radius)),
            plate_area,
            first_patch: vec![0],
            patch_area: Vec::new(),
        },
        shape: [shape1, shape2],
        rim_shape: [rim1, rim2],
    };
    let mut patches = Patches {
        first_weight: vec![0],
        weights: Vec::new(),
    };
    for (ring, area) in interface.iter().enumerate() {
        if *area > 0.0 {
            let around = Around {
                plan,
                view,
                bolt,
                radius: [edges[ring], edges[ring + 1]],
            };
            around.patches(*area, &mut rings.columns.patch_area, &mut patches);
        }
        rings
            .columns
            .first_patch
            .push(rings.columns.patch_area.len());
    }
    Cell {
        head_share: head
            .iter()
            .map(|area| area / head_area.max(f64::MIN_POSITIVE))
            .collect(),
        edges,
        rings,
        patches,
        like: bolt,
    }
}

/// Area under the head in each ring, m².
///
/// A head that covers nothing of the faying faces, over a wide hole, presses around it: the shank
/// then joins the plates over the contact.
fn under_head(cone: Cone, view: &View, edges: &[f64], interface: &[f64]) -> Vec<f64> {
    let within = |outermost: f64| -> Vec<f64> {
        let area = |radius: f64| view.interface.area_within(radius.min(outermost));
        edges
            .windows(2)
            .zip(interface)
            .map(|(pair, whole)| {
                let part = area(pair[1]) - area(pair[0]);
                if part > NO_AREA * whole {
                    part.min(*whole)
                } else {
                    0.0
                }
            })
            .collect()
    };
    let head = within(cone.bearing_radius);
    if head.iter().sum::<f64>() > 0.0 {
        head
    } else {
        within(cone.contact_radius)
    }
}

/// One ring around one bolt.
struct Around<'a> {
    plan: &'a Plan,
    view: &'a View,
    bolt: usize,
    radius: [f64; 2],
}

impl Around<'_> {
    /// Cuts the ring's share of the faying face into patches of one pressure each.
    ///
    /// Where only this bolt presses one patch is enough, with the mean pressure of the ring, so
    /// that the rings carry the force exactly.
    fn patches(&self, area: f64, areas: &mut Vec<f64>, patches: &mut Patches) {
        let own = (self.bolt, self.mean_pressure());
        let reaching: Vec<(usize, [f64; 2])> = self
            .view
            .others
            .iter()
            .copied()
            .filter(|(other, to)| {
                let reach = self.plan.sites[*other].cone.contact_radius;
                to[0].hypot(to[1]) < self.radius[1] + reach
            })
            .collect();
        let [inner, outer] = self.radius;
        let middle = (0.5 * (inner * inner + outer * outer)).sqrt();
        let mut arcs = Vec::new();
        if !reaching.is_empty() {
            arcs = self.view.interface.region.arcs(middle);
            for (other, to) in &reaching {
                arcs = outside_disc(&arcs, middle, (*to, self.plan.hole_radius(*other)));
            }
        }
        let sweep: f64 = arcs.iter().map(|arc| arc.sweep).sum();
        if arcs.is_empty() {
            areas.push(area);
            patches.push([own].into_iter());
            return;
        }
        let mut alone = 0.0;
        for arc in arcs {
            let parts = (arc.sweep / TAU * PATCHES_PER_TURN).ceil().max(1.0);
            for part in 0..parts as usize {
                let angle = arc.start + arc.sweep * (part as f64 + 0.5) / parts;
                let point = [middle * angle.cos(), middle * angle.sin()];
                let part = area * arc.sweep / parts / sweep;
                let mut weights = reaching
                    .iter()
                    .map(|(other, to)| {
                        let distance = (point[0] - to[0]).hypot(point[1] - to[1]);
                        (*other, self.plan.sites[*other].cone.pressure(distance, 1.0))
                    })
                    .filter(|(_, weight)| *weight > 0.0)
                    .peekable();
                if weights.peek().is_none() {
                    alone += part;
                    continue;
                }
                areas.push(part);
                patches.push([own].into_iter().chain(weights));
            }
        }
        // What no neighbour presses is one patch.
        if alone > 0.0 {
            areas.push(alone);
            patches.push([own].into_iter());
        }
    }

    /// Mean of the own pressure over the ring, per force, 1/m².
    fn mean_pressure(&self) -> f64 {
        let [inner, outer] = self.radius;
        let cone = &self.plan.sites[self.bolt].cone;
        if inner >= cone.contact_radius * (1.0 - 1e-12) {
            return 0.0;
        }
        let force = cone.carried_within(outer) - cone.carried_within(inner);
        force / (0.5 * TAU * (outer - inner) * (outer + inner))
    }
}

/// Whether two cells have the same rings and, under equal forces, the same pressures.
fn alike(first: &Cell, second: &Cell) -> bool {
    const SAME: f64 = 1e-9;
    let near = |a: &[f64], b: &[f64]| {
        let scale = a.iter().fold(0.0_f64, |most, value| most.max(value.abs()));
        a.len() == b.len()
            && a.iter()
                .zip(b)
                .all(|(one, other)| (one - other).abs() <= SAME * scale)
    };
    let (a, b) = (&first.rings.columns, &second.rings.columns);
    near(&first.edges, &second.edges)
        && near(&first.head_share, &second.head_share)
        && near(&a.source_area, &b.source_area)
        && (0..2).all(|k| near(&a.plate_area[k], &b.plate_area[k]))
        && a.first_patch == b.first_patch
        && (0..a.source_area.len()).all(|ring| {
            let sorted = |cell: &Cell| {
                let mut values: Vec<(f64, f64)> = (cell.rings.columns.first_patch[ring]
                    ..cell.rings.columns.first_patch[ring + 1])
                    .map(|patch| {
                        let weight = cell.patches.of(patch).iter().map(|(_, w)| w).sum();
                        (weight, cell.rings.columns.patch_area[patch])
                    })
                    .collect();
                values.sort_by(|one, other| {
                    one.0.total_cmp(&other.0).then(one.1.total_cmp(&other.1))
                });
                values.into_iter().unzip::<f64, f64, Vec<_>, Vec<_>>()
            };
            let (one, other) = (sorted(first), sorted(second));
            near(&one.0, &other.0) && near(&one.1, &other.1)
        })
}
