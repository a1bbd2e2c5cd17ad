//! What every grid cell holds: exact areas, patches of pressure, links to the next cells.

use crate::resistance::{
    cells::Plan,
    column::Columns,
    failure::Failure,
    plan_grid::{
        GRID, PlanGrid,
        cover::{Cover, Disc},
    },
    rings::Patches,
};

/// Samples of pressure along each side of a grid cell, where it is no wider than it should be.
const FEWEST: usize = 4;
/// Most samples along each side of a grid cell.
const MOST: usize = 64;

/// One grid cell and the bolts whose hole, head or contact can reach into it.
struct Spot {
    node: usize,
    at: [usize; 2],
    low: [f64; 2],
    high: [f64; 2],
    near: Vec<usize>,
}

impl Plan {
    /// How far a bolt's hole, head or contact reaches, m.
    fn reach(&self, bolt: usize) -> f64 {
        let cone = &self.sites[bolt].cone;
        cone.contact_radius
            .max(cone.bearing_radius)
            .max(self.hole_radius(bolt))
    }

    fn reaches(&self, bolt: usize, axis: usize, [low, high]: [f64; 2]) -> bool {
        let (at, reach) = (self.sites[bolt].at[axis], self.reach(bolt));
        at + reach >= low && at - reach <= high
    }

    /// Holes of some bolts and those without a bolt in one plate; of the faying faces when none is
    /// named.
    fn holes(&self, plate: Option<usize>, bolts: &[usize]) -> impl Iterator<Item = Disc> {
        let held = bolts.iter().map(move |bolt| {
            let site = &self.sites[*bolt];
            let radius = plate.map_or(self.hole_radius(*bolt), |plate| site.hole_radius[plate]);
            (site.at, radius)
        });
        let empty = self.empty.iter();
        held.chain(empty.map(move |hole| (hole.at, hole.radius_in(plate))))
    }

    /// Samples along each side of a rectangle, close enough that one at least falls between the
    /// hole and the edge of each contact: a disc as wide as that ring holds a point of a lattice
    /// that is finer by √2.
    fn samples(&self, spot: &Spot) -> usize {
        let widest = (0..2)
            .map(|k| spot.high[k] - spot.low[k])
            .fold(0.0, f64::max);
        let ring = spot.near.iter().map(|bolt| {
            let cone = &self.sites[*bolt].cone;
            cone.contact_radius - self.hole_radius(*bolt).max(cone.hole_radius)
        });
        let narrowest = ring.fold(f64::INFINITY, f64::min);
        let needed = 1.5 * widest / narrowest;
        if needed.is_finite() && needed > 0.0 {
            (needed.ceil() as usize).clamp(FEWEST, MOST)
        } else {
            FEWEST
        }
    }
}

impl PlanGrid {
    /// Fills every cell between the lines.
    pub(super) fn fill(&mut self, lines: &[Vec<f64>; 2]) -> Result<(), Failure> {
        let cells = self.cells.clone();
        let plan = &cells.plan;
        let [columns, rows] = self.size;
        let bolts: Vec<usize> = (0..plan.sites.len()).collect();
        let among = |bolts: &[usize], axis: usize, at: usize| -> Vec<usize> {
            let between = [lines[axis][at], lines[axis][at + 1]];
            let reaches = |bolt: &&usize| plan.reaches(**bolt, axis, between);
            bolts.iter().filter(reaches).copied().collect()
        };
        let in_column: Vec<Vec<usize>> = (0..columns).map(|i| among(&bolts, 0, i)).collect();
        for j in 0..rows {
            let in_row = among(&bolts, 1, j);
            let mut of_row = vec![false; bolts.len()];
            for bolt in &in_row {
                of_row[*bolt] = true;
            }
            for (i, bolts) in in_column.iter().enumerate() {
                let spot = Spot {
                    node: j * columns + i,
                    at: [i, j],
                    low: [lines[0][i], lines[1][j]],
                    high: [lines[0][i + 1], lines[1][j + 1]],
                    near: bolts
                        .iter()
                        .filter(|bolt| of_row[**bolt])
                        .copied()
                        .collect(),
                };
                self.weigh(plan, &spot);
                self.join(plan, (&spot, lines));
            }
        }
        self.settle(plan)
    }

    /// Areas of one grid cell, and its patches of pressure.
    fn weigh(&mut self, plan: &Plan, spot: &Spot) {
        let whole = Cover::new(spot.low, spot.high);
        let on = [0, 1].map(|plate| whole.clone().on_plate(&plan.outlines[plate]));
        for (plate, on) in on.iter().enumerate() {
            let covered = on.clone().without(plan.holes(Some(plate), &spot.near));
            self.columns.plate_area[plate].push(covered.area());
        }
        let heated = on[0].clone().in_zone(plan.source.zone);
        let heated = heated.without(plan.holes(Some(0), &spot.near)).area();
        self.columns.source_area.push(heated);
        let [first, _] = on;
        let touching = first.on_plate(&plan.outlines[1]);
        let touching = touching.without(plan.holes(None, &spot.near)).area();
        if touching > 0.0 {
            self.sample(plan, (spot, touching));
        }
        self.columns.first_patch.push(self.columns.patch_area.len());
    }

    /// Cuts the faying face of one grid cell into patches of one pressure each.
    fn sample(&mut self, plan: &Plan, (spot, touching): (&Spot, f64)) {
        let count = plan.samples(spot);
        let step = [0, 1].map(|k| (spot.high[k] - spot.low[k]) / count as f64);
        let first = self.columns.patch_area.len();
        let (mut open, mut met) = (0, 0);
        if !spot.near.is_empty() {
            for index in 0..count * count {
                let place = [index % count, index / count];
                let point = [0, 1].map(|k| spot.low[k] + step[k] * (place[k] as f64 + 0.5));
                if !plan.on_both(point, &spot.near) {
                    continue;
                }
                met += 1;
                let distances = spot.near.iter().map(|bolt| {
                    let at = plan.sites[*bolt].at;
                    (*bolt, (point[0] - at[0]).hypot(point[1] - at[1]))
                });
                let head = distances
                    .clone()
                    .find(|(bolt, distance)| *distance < plan.sites[*bolt].cone.bearing_radius);
                let weights: Vec<(usize, f64)> = distances
                    .map(|(bolt, distance)| (bolt, plan.sites[bolt].cone.pressure(distance, 1.0)))
                    .filter(|(_, weight)| *weight > 0.0)
                    .collect();
                if weights.is_empty() && head.is_none() {
                    open += 1;
                    continue;
                }
                if let Some((bolt, _)) = head {
                    self.under_head.push((self.columns.patch_area.len(), bolt));
                }
                self.columns.patch_area.push(1.0);
                self.patches.push(weights.into_iter());
            }
        }
        if open > 0 || met == 0 {
            self.columns.patch_area.push(f64::from(open.max(1)));
            self.patches.push(std::iter::empty());
        }
        let each = touching / f64::from(met.max(1));
        for area in &mut self.columns.patch_area[first..] {
            *area *= each;
        }
    }

    /// Joins one grid cell to the next ones, and to the rim where its outline ends there.
    fn join(&mut self, plan: &Plan, (spot, lines): (&Spot, &[Vec<f64>; 2])) {
        for axis in 0..2 {
            let last = spot.at[axis] + 1 == self.size[axis];
            if !last {
                let mut high = spot.high;
                high[axis] = lines[axis][spot.at[axis] + 2];
                let distance = 0.5 * (high[axis] - spot.low[axis]);
                for plate in 0..2 {
                    let width = Cover::new(spot.low, high)
                        .on_plate(&plan.outlines[plate])
                        .without(plan.holes(Some(plate), &spot.near))
                        .width(axis, spot.high[axis]);
                    self.shape[spot.node][axis][plate] = width / distance;
                }
            }
            let across = spot.high[1 - axis] - spot.low[1 - axis];
            let half = 0.5 * (spot.high[axis] - spot.low[axis]);
            let (mut low, mut high) = (spot.low, spot.high);
            low[axis] -= half;
            high[axis] += half;
            let around = Cover::new(low, high).on_plate(&plan.outlines[1]);
            for (place, outermost) in [
                (spot.low[axis], spot.at[axis] == 0),
                (spot.high[axis], last),
            ] {
                let inside = if outermost {
                    0.0
                } else {
                    around.width(axis, place)
                };
                self.rim_shape[spot.node] += (across - inside).max(0.0) / half;
            }
        }
    }

    /// Brings areas to the sums of the whole plates and each bolt's pressure to its whole force.
    ///
    /// Shanks join the plates under their heads; where a head covers nothing of the faying faces,
    /// over the contact.
    fn settle(&mut self, plan: &Plan) -> Result<(), Failure> {
        let scaled = |areas: &mut Vec<f64>, exact: f64| {
            let factor = exact / areas.iter().sum::<f64>();
            for area in areas {
                *area *= factor;
            }
        };
        let cells = self.cells.clone();
        for plate in 0..2 {
            scaled(&mut self.columns.plate_area[plate], cells.plate_area[plate]);
        }
        scaled(&mut self.columns.source_area, cells.source_area);
        scaled(&mut self.columns.patch_area, cells.interface_area);
        for (patch, bolt) in &self.under_head {
            self.head_area[*bolt] += self.columns.patch_area[*patch];
        }
        let mut pressed = vec![0.0; plan.sites.len()];
        let headless: Vec<bool> = self.head_area.iter().map(|area| *area <= 0.0).collect();
        for (patch, area) in self.columns.patch_area.iter().enumerate() {
            for (bolt, _) in self.patches.of(patch) {
                pressed[*bolt] += area;
                if headless[*bolt] {
                    self.under_head.push((patch, *bolt));
                    self.head_area[*bolt] += area;
                }
            }
        }
        if let Some(bolt) = pressed.iter().position(|area| *area <= 0.0) {
            return Err(Failure::NoContact {
                bolt,
                network: GRID,
            });
        }
        self.patches
            .restore(&self.columns.patch_area, self.head_area.len());
        Ok(())
    }
}

impl Plan {
    /// Whether a point lies on both plates and in none of the holes of some bolts.
    fn on_both(&self, point: [f64; 2], near: &[usize]) -> bool {
        self.outlines
            .iter()
            .all(|(outline, origin)| outline.depth([0, 1].map(|k| point[k] - origin[k])) >= 0.0)
            && self
                .holes(None, near)
                .all(|(at, radius)| (point[0] - at[0]).hypot(point[1] - at[1]) >= radius)
    }
}

/// An empty grid of a size, to be filled.
pub(super) fn columns() -> (Columns, Patches) {
    (
        Columns {
            first_patch: vec![0],
            ..Columns::default()
        },
        Patches {
            first_weight: vec![0],
            weights: Vec::new(),
        },
    )
}
