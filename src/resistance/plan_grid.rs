//! Heat through both plates on one plan grid: bolts share the plates as they really do.
//!
//! Each grid cell has one mean temperature per plate and the columns of the ring network; plate
//! edges and holes are partial cells. No borders between bolts, so neither the too wide nor the
//! too narrow ways of the cells; an estimate from no certain side.

use crate::{
    joint::{Outline, Sink, Zone},
    numerics::block_grid::Sheets,
    resistance::{
        cells::{Cells, Plan},
        column::{Columns, Coupling, Flow, Inlet, Plates},
        path::{Load, Path, Whole},
        rings::Patches,
    },
};

/// Points along each side of a grid cell that sample edges, holes and pressure.
const SAMPLES: u32 = 4;
/// Grid lines across the ring from the hole to the contact edge, at fineness 1.
const LINES_IN_CONTACT: f64 = 4.0;
/// Widest cell as a share of the longer side of the plan, at fineness 1.
const WIDEST: f64 = 1.0 / 24.0;
/// Most nodes at fineness 1; forty bolts at half of it change the answer by 0.7 %.
const MOST_NODES: f64 = 10_000.0;
/// Growth of the cell width with distance from the contact edge.
const GROWTH: f64 = 0.25;

/// Both plates of a joint on one graded grid, ready for any load.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanGrid {
    cells: Cells,
    size: [usize; 2],
    columns: Columns,
    patches: Patches,
    /// Patches under a head and the bolt it belongs to.
    under_head: Vec<(usize, usize)>,
    head_area: Vec<f64>,
    /// Width over distance of the links along both axes, for both plates.
    shape: Vec<[[f64; 2]; 2]>,
    /// Width over distance to the rim of the second plate.
    rim_shape: Vec<f64>,
}

/// Puts a plan on a grid; fineness 1 is the normal one, 2 halves every cell.
///
/// Many bolts get a coarser grid, so that a solution stays well below a second.
pub fn plan_grid(cells: &Cells, fineness: f64) -> PlanGrid {
    let plan = &cells.plan;
    let mut coarser = fineness;
    let mut lines = [0, 1].map(|axis| grid_lines(plan, axis, coarser));
    while (lines[0].len() * lines[1].len()) as f64 > MOST_NODES * fineness * fineness {
        coarser *= 0.9;
        lines = [0, 1].map(|axis| grid_lines(plan, axis, coarser));
    }
    let size = [lines[0].len() - 1, lines[1].len() - 1];
    let mut grid = PlanGrid {
        size,
        columns: Columns {
            first_patch: vec![0],
            ..Columns::default()
        },
        patches: Patches {
            first_weight: vec![0],
            weights: Vec::new(),
        },
        under_head: Vec::new(),
        head_area: vec![0.0; plan.sites.len()],
        shape: vec![[[0.0; 2]; 2]; size[0] * size[1]],
        rim_shape: vec![0.0; size[0] * size[1]],
        cells: cells.clone(),
    };
    for j in 0..size[1] {
        for i in 0..size[0] {
            grid.sample(
                [lines[0][i], lines[1][j]],
                [lines[0][i + 1], lines[1][j + 1]],
            );
            grid.join([i, j], &lines);
        }
    }
    grid.settle();
    grid
}

/// Grid lines along one axis: at every edge, close in the contacts, wide between.
fn grid_lines(plan: &Plan, axis: usize, fineness: f64) -> Vec<f64> {
    let mut stops: Vec<f64> = Vec::new();
    let mut add = |outline: &Outline, at: f64| match *outline {
        Outline::Rectangle { size } => stops.extend([at, at + size[axis]]),
        Outline::Disc { radius } => stops.extend([at - radius, at + radius]),
    };
    for (outline, origin) in &plan.outlines {
        add(outline, origin[axis]);
    }
    match plan.source.zone {
        Zone::Face => {}
        Zone::Rectangle { centre, size } => stops.extend([
            centre[axis] - 0.5 * size[axis],
            centre[axis] + 0.5 * size[axis],
        ]),
        Zone::Disc { centre, radius } => {
            stops.extend([centre[axis] - radius, centre[axis] + radius]);
        }
    }
    stops.sort_by(f64::total_cmp);
    let extent = stops[stops.len() - 1] - stops[0];
    stops.dedup_by(|next, stop| *next - *stop < 1e-6 * extent);
    let width = |x: f64| {
        let near = plan.sites.iter().map(|site| {
            let cone = &site.cone;
            let close = (cone.contact_radius - cone.hole_radius) / LINES_IN_CONTACT;
            close + GROWTH * ((x - site.at[axis]).abs() - cone.contact_radius).max(0.0)
        });
        near.fold(WIDEST * extent, f64::min) / fineness
    };
    let mut lines = vec![stops[0]];
    for pair in stops.windows(2) {
        // ∫ dx/width by fine steps; lines at equal parts of it.
        const STEPS: usize = 400;
        let step = (pair[1] - pair[0]) / STEPS as f64;
        let mut counted = vec![0.0];
        for index in 0..STEPS {
            let x = pair[0] + (index as f64 + 0.5) * step;
            counted.push(counted[index] + step / width(x));
        }
        let parts = counted[STEPS].ceil().max(1.0) as usize;
        for part in 1..parts {
            let wanted = counted[STEPS] * part as f64 / parts as f64;
            let after = counted.partition_point(|sum| *sum < wanted);
            let back = (counted[after] - wanted) / (counted[after] - counted[after - 1]);
            lines.push(pair[0] + (after as f64 - back) * step);
        }
        lines.push(pair[1]);
    }
    lines
}

fn inside(outline: &Outline, origin: [f64; 2], point: [f64; 2]) -> bool {
    let [x, y] = [point[0] - origin[0], point[1] - origin[1]];
    match *outline {
        Outline::Rectangle { size } => (0.0..=size[0]).contains(&x) && (0.0..=size[1]).contains(&y),
        Outline::Disc { radius } => x.hypot(y) <= radius,
    }
}

impl Plan {
    fn on_outline(&self, plate: usize, point: [f64; 2]) -> bool {
        let (outline, origin) = &self.outlines[plate];
        inside(outline, *origin, point)
    }

    fn on_plate(&self, plate: usize, (point, near): ([f64; 2], &[usize])) -> bool {
        self.on_outline(plate, point)
            && near.iter().all(|bolt| {
                let site = &self.sites[*bolt];
                (point[0] - site.at[0]).hypot(point[1] - site.at[1]) >= site.hole_radius[plate]
            })
    }

    /// Bolts whose hole, head or contact can reach into a rectangle.
    fn near(&self, low: [f64; 2], high: [f64; 2]) -> Vec<usize> {
        let reaches = |bolt: &usize| {
            let site = &self.sites[*bolt];
            let reach = site
                .cone
                .contact_radius
                .max(site.cone.bearing_radius)
                .max(self.hole_radius(*bolt));
            (0..2).all(|k| site.at[k] + reach >= low[k] && site.at[k] - reach <= high[k])
        };
        (0..self.sites.len()).filter(reaches).collect()
    }

    fn heated(&self, point: [f64; 2]) -> bool {
        match self.source.zone {
            Zone::Face => true,
            Zone::Rectangle { centre, size } => {
                (0..2).all(|k| (point[k] - centre[k]).abs() <= 0.5 * size[k])
            }
            Zone::Disc { centre, radius } => {
                (point[0] - centre[0]).hypot(point[1] - centre[1]) <= radius
            }
        }
    }
}

/// The middle of one of the samples between two coordinates.
fn sample(low: f64, high: f64, index: u32) -> f64 {
    low + (high - low) * (f64::from(index) + 0.5) / f64::from(SAMPLES)
}

impl PlanGrid {
    /// Samples one grid cell: areas, patches of pressure, patches under heads.
    fn sample(&mut self, low: [f64; 2], high: [f64; 2]) {
        let plan = &self.cells.plan;
        let near = plan.near(low, high);
        let point_area = (high[0] - low[0]) * (high[1] - low[1]) / f64::from(SAMPLES * SAMPLES);
        let (mut areas, mut source, mut open) = ([0.0; 2], 0.0, 0.0);
        for index in 0..SAMPLES * SAMPLES {
            let point = [
                sample(low[0], high[0], index % SAMPLES),
                sample(low[1], high[1], index / SAMPLES),
            ];
            let on = [0, 1].map(|plate| plan.on_plate(plate, (point, &near)));
            for plate in 0..2 {
                areas[plate] += if on[plate] { point_area } else { 0.0 };
            }
            if on[0] && plan.heated(point) {
                source += point_area;
            }
            if !(on[0] && on[1]) {
                continue;
            }
            let distances = near.iter().map(|bolt| {
                let at = plan.sites[*bolt].at;
                (*bolt, (point[0] - at[0]).hypot(point[1] - at[1]))
            });
            let weights: Vec<(usize, f64)> = distances
                .clone()
                .map(|(bolt, distance)| (bolt, plan.sites[bolt].cone.pressure(distance, 1.0)))
                .filter(|(_, weight)| *weight > 0.0)
                .collect();
            let head = distances
                .clone()
                .find(|(bolt, distance)| *distance < plan.sites[*bolt].cone.bearing_radius);
            if weights.is_empty() && head.is_none() {
                open += point_area;
                continue;
            }
            if let Some((bolt, _)) = head {
                self.under_head.push((self.columns.patch_area.len(), bolt));
                self.head_area[bolt] += point_area;
            }
            self.columns.patch_area.push(point_area);
            self.patches.push(weights.into_iter());
        }
        if open > 0.0 {
            self.columns.patch_area.push(open);
            self.patches.push(std::iter::empty());
        }
        self.columns.first_patch.push(self.columns.patch_area.len());
        self.columns.source_area.push(source);
        for (plate, area) in areas.into_iter().enumerate() {
            self.columns.plate_area[plate].push(area);
        }
    }

    /// Joins one grid cell to the next ones, and to the rim where its outline ends there.
    fn join(&mut self, at: [usize; 2], lines: &[Vec<f64>; 2]) {
        let plan = &self.cells.plan;
        let node = at[1] * self.size[0] + at[0];
        let low = [0, 1].map(|k| lines[k][at[k]]);
        let high = [0, 1].map(|k| lines[k][at[k] + 1]);
        let near = plan.near(low, high);
        for axis in 0..2 {
            let across = 1 - axis;
            let face = |place: f64, on: &dyn Fn([f64; 2]) -> bool| {
                let count = (0..SAMPLES)
                    .filter(|index| {
                        let mut point = [place; 2];
                        point[across] = sample(low[across], high[across], *index);
                        on(point)
                    })
                    .count();
                (high[across] - low[across]) * count as f64 / f64::from(SAMPLES)
            };
            if at[axis] + 1 < self.size[axis] {
                let distance = 0.5 * (lines[axis][at[axis] + 2] - low[axis]);
                for plate in 0..2 {
                    let width = face(high[axis], &|point| plan.on_plate(plate, (point, &near)));
                    self.shape[node][axis][plate] = width / distance;
                }
            }
            let half = 0.5 * (high[axis] - low[axis]);
            for (place, last) in [
                (low[axis], at[axis] == 0),
                (high[axis], at[axis] + 1 == self.size[axis]),
            ] {
                let beyond = face(place, &|point| last || !plan.on_outline(1, point));
                self.rim_shape[node] += beyond / half;
            }
        }
    }

    /// Brings sampled areas to the exact sums, and each bolt's pressure to its whole force.
    fn settle(&mut self) {
        let scaled = |areas: &mut Vec<f64>, exact: f64| {
            let factor = exact / areas.iter().sum::<f64>();
            for area in areas {
                *area *= factor;
            }
        };
        for plate in 0..2 {
            scaled(
                &mut self.columns.plate_area[plate],
                self.cells.plate_area[plate],
            );
        }
        scaled(&mut self.columns.source_area, self.cells.source_area);
        scaled(&mut self.columns.patch_area, self.cells.interface_area);
        self.patches
            .restore(&self.columns.patch_area, self.head_area.len());
    }

    /// The resistances under a load, with the heat free to choose its way through the plates.
    ///
    /// Contact, lower and upper bound are those of the cells.
    /// Checked: `round_joint_agrees_with_the_ring_network`, `plan_grid_meets_the_reference_cases`.
    pub fn solve<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Path {
        let conductance = self.conductance(load);
        let met = vec![f64::INFINITY; conductance.len()];
        let plates = self.cells.plates(load);
        // The two systems know nothing of each other, so both cores can have one.
        let (whole, perfect) = rayon::join(
            || self.whole(&plates, &conductance),
            || self.whole(&plates, &met),
        );
        self.cells.path(load, &whole, &perfect)
    }

    /// Source to sink alone, K/W: what a comparison of two grids needs.
    pub fn source_to_sink<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> f64 {
        let plates = self.cells.plates(load);
        self.whole(&plates, &self.conductance(load)).source - self.cells.film_drop()
    }

    fn conductance<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Vec<f64> {
        let open = (load.conductance)(0.0);
        let mut conductance: Vec<f64> = (0..self.columns.patch_area.len())
            .map(|patch| match self.patches.of(patch) {
                [] => open,
                _ => (load.conductance)(self.patches.pressure(patch, load.forces)),
            })
            .collect();
        for (patch, bolt) in &self.under_head {
            conductance[*patch] += load.shanks[*bolt] / self.head_area[*bolt];
        }
        conductance
    }

    fn whole(&self, plates: &Plates, conductance: &[f64]) -> Whole {
        self.flow(plates, conductance)
            .map_or(Whole::BLOCKED, |flow| self.cells.whole_of(&flow))
    }

    fn flow(&self, plates: &Plates, conductance: &[f64]) -> Option<Flow> {
        let constants = plates.constants();
        let count = self.columns.count();
        let couplings: Vec<Coupling> = (0..count)
            .map(|node| self.columns.couple(node, &constants, conductance))
            .collect();
        let joined: f64 = couplings.iter().map(Coupling::total).sum();
        if joined <= 0.0 {
            return None;
        }
        let mut sheets = Sheets::new(self.size[0], self.size[1]);
        let mut heat = vec![[0.0; 2]; count];
        for node in 0..count {
            for axis in 0..2 {
                for plate in 0..2 {
                    let shape = self.shape[node][axis][plate];
                    if shape > 0.0 {
                        sheets.link((node, axis), plate, constants.sheet[plate] * shape);
                    }
                }
            }
        }
        for node in 0..count {
            if self.cells.plan.sink == Sink::Rim && self.columns.plate_area[1][node] > 0.0 {
                sheets.blocks[node][2] += constants.sheet[1] * self.rim_shape[node];
            }
            self.columns.fill(
                node,
                &constants,
                &couplings[node],
                (&mut sheets.blocks[node], &mut heat[node]),
            );
            for plate in 0..2 {
                // Nothing of the plate is here, or it hangs on nothing: a node of its own.
                if sheets.blocks[node][2 * plate] <= 0.0 {
                    sheets.blocks[node][2 * plate] = 1.0;
                }
            }
        }
        let temperatures = sheets.solution(&heat)?;
        let mut flow = Flow {
            hottest: f64::NEG_INFINITY,
            ..Flow::default()
        };
        for (node, mean) in temperatures.into_iter().enumerate() {
            self.columns
                .read(node, &constants, (&couplings[node], mean), &mut flow);
        }
        debug_assert!(plates.inlet != Inlet::Rim, "joints are heated on a face");
        Some(flow)
    }
}

#[cfg(test)]
mod tests;
