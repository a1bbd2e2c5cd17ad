//! The grid under the screening model: areas, links in the plane, source and sink.

use crate::{
    joint::{CooledPart, Cooling, Edge, Joint, Plate, Sink, Zone, radiative_film},
    layout::{Failure, Size},
    numerics::{
        banded::{BandedMatrix, Factor},
        grading::{Mark, graded},
    },
};

/// Cells along the longer side of where bolts can stand.
const CELLS: f64 = 40.0;
/// Growth of the cells outside of it, and the widest over the finest.
const GROWTH: f64 = 1.4;
const WIDEST: f64 = 4.0;
/// Points along each side of a cell that tell what it covers.
const SAMPLES: usize = 4;
/// Conductance that an open face has at least, W/(m² K): below that of any radiation between plates
/// near 300 K, and enough to hold a plate that no bolt holds yet.
const LEAST_OPEN: f64 = 1e-3;

/// How the faces meet where no bolt presses them.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Faces {
    /// As the open gap conducts.
    AsTheyAre,
    /// Perfectly.
    Met,
}

impl Faces {
    /// Conductance between the sheets where no bolt presses, W/(m² K).
    fn open(self, size: &Size, interface: usize) -> f64 {
        let transverse = size.transverse(interface);
        match self {
            Self::Met => transverse.recip(),
            Self::AsTheyAre => {
                let open = size.conditions.faces[interface].conductance(0.0);
                (open.max(LEAST_OPEN).recip() + transverse).recip()
            }
        }
    }
}

/// All plates of a joint on one grid; the nodes of a cell follow each other.
#[derive(Debug)]
pub(super) struct Grid {
    /// Grid lines of the outer and of the inner loop, m.
    lines: [Vec<f64>; 2],
    /// Which axis the inner loop runs along: the one with fewer cells.
    inner: usize,
    /// Area of each node, m².
    area: Vec<f64>,
    /// Area of each cell in which the plates of an interface can meet, m².
    meeting: Vec<Vec<f64>>,
    /// Conductivity times thickness of each node, W/K.
    sheets: Vec<f64>,
    /// The same of each plate beside its ribs.
    plain: Vec<f64>,
    cell: f64,
}

impl Grid {
    pub(super) fn new(size: &Size) -> Self {
        let joint = &size.joint;
        let bounds = joint.plates.iter().map(Plate::bounds);
        let outer = bounds.clone().fold(
            [
                f64::INFINITY,
                f64::INFINITY,
                f64::NEG_INFINITY,
                f64::NEG_INFINITY,
            ],
            |all, each| {
                [
                    all[0].min(each[0]),
                    all[1].min(each[1]),
                    all[2].max(each[2]),
                    all[3].max(each[3]),
                ]
            },
        );
        let common = bounds.fold(
            [
                f64::NEG_INFINITY,
                f64::NEG_INFINITY,
                f64::INFINITY,
                f64::INFINITY,
            ],
            |all, each| {
                [
                    all[0].max(each[0]),
                    all[1].max(each[1]),
                    all[2].min(each[2]),
                    all[3].min(each[3]),
                ]
            },
        );
        let longer = (common[2] - common[0]).max(common[3] - common[1]);
        let cell = longer / CELLS;
        let across = [0, 1].map(|axis| {
            lines(
                [outer[axis], common[axis], common[axis + 2], outer[axis + 2]],
                cell,
            )
        });
        let inner = usize::from(across[1].len() <= across[0].len());
        let [x, y] = across;
        let lines = if inner == 1 { [x, y] } else { [y, x] };
        let mut grid = Self {
            lines,
            inner,
            area: Vec::new(),
            meeting: vec![Vec::new(); joint.interfaces()],
            sheets: Vec::new(),
            plain: (0..joint.plates.len())
                .map(|plate| size.conditions.conductivity[plate] * joint.plates[plate].thickness)
                .collect(),
            cell,
        };
        grid.fill(size);
        grid
    }

    fn fill(&mut self, size: &Size) {
        let joint = &size.joint;
        for cell in 0..self.cells() {
            let points = self.points(cell);
            let each = self.cell_area(cell) / points.len() as f64;
            for (index, plate) in joint.plates.iter().enumerate() {
                let on = points.iter().filter(|point| plate.covers(**point));
                let conductivity = size.conditions.conductivity[index];
                let (count, thickness) = on.fold((0.0, 0.0), |(count, sum), point| {
                    (count + 1.0, sum + plate.thickness_at(*point))
                });
                self.area.push(each * count);
                self.sheets.push(if count > 0.0 {
                    conductivity * thickness / count
                } else {
                    0.0
                });
            }
            for (interface, meeting) in self.meeting.iter_mut().enumerate() {
                let plates = joint.meeting(interface);
                let meets = |point: &&[f64; 2]| {
                    plates
                        .iter()
                        .all(|plate| plate.covers(**point) && plate.stands_at(**point))
                };
                meeting.push(each * points.iter().filter(meets).count() as f64);
            }
        }
    }

    pub(super) fn plates(&self) -> usize {
        self.plain.len()
    }

    /// Conductivity times thickness of a plate beside its ribs, W/K.
    pub(super) fn sheet(&self, plate: usize) -> f64 {
        self.plain[plate]
    }

    /// Side of a cell where bolts can stand, m.
    pub(super) fn cell(&self) -> f64 {
        self.cell
    }

    fn rows(&self) -> usize {
        self.lines[1].len() - 1
    }

    fn cells(&self) -> usize {
        (self.lines[0].len() - 1) * self.rows()
    }

    /// Number of nodes.
    pub(super) fn count(&self) -> usize {
        self.cells() * self.plates()
    }

    fn node(&self, cell: usize, plate: usize) -> usize {
        cell * self.plates() + plate
    }

    /// Lower and upper bounds of a cell along the outer and the inner loop, m.
    fn bounds(&self, cell: usize) -> [[f64; 2]; 2] {
        let at = [cell / self.rows(), cell % self.rows()];
        [0, 1].map(|k| [self.lines[k][at[k]], self.lines[k][at[k] + 1]])
    }

    fn width(&self, cell: usize, along: usize) -> f64 {
        let [low, high] = self.bounds(cell)[along];
        high - low
    }

    fn cell_area(&self, cell: usize) -> f64 {
        self.width(cell, 0) * self.width(cell, 1)
    }

    /// A point of the two loops in joint coordinates.
    fn point(&self, [outer, inner]: [f64; 2]) -> [f64; 2] {
        if self.inner == 1 {
            [outer, inner]
        } else {
            [inner, outer]
        }
    }

    fn centre(&self, cell: usize) -> [f64; 2] {
        self.point(
            self.bounds(cell)
                .map(|[low, high]| f64::midpoint(low, high)),
        )
    }

    fn points(&self, cell: usize) -> Vec<[f64; 2]> {
        let bounds = self.bounds(cell);
        let at = |k: usize, index: usize| {
            let [low, high] = bounds[k];
            low + (high - low) * (index as f64 + 0.5) / SAMPLES as f64
        };
        (0..SAMPLES * SAMPLES)
            .map(|index| self.point([at(0, index / SAMPLES), at(1, index % SAMPLES)]))
            .collect()
    }

    /// The cell after one along the outer (0) or inner (1) loop.
    fn next(&self, cell: usize, along: usize) -> Option<usize> {
        if along == 1 {
            (!(cell + 1).is_multiple_of(self.rows())).then_some(cell + 1)
        } else {
            (cell + self.rows() < self.cells()).then_some(cell + self.rows())
        }
    }

    /// Share of a cell that a plate covers.
    fn share(&self, cell: usize, plate: usize) -> f64 {
        self.area[self.node(cell, plate)] / self.cell_area(cell)
    }

    /// The system without bolts, factored.
    pub(super) fn factor(&self, size: &Size, faces: Faces) -> Result<Factor, Failure> {
        let plates = self.plates();
        let mut matrix = BandedMatrix::new(self.count(), (self.rows() + 1) * plates);
        let harmonic = |one: f64, other: f64| {
            if one > 0.0 && other > 0.0 {
                2.0 * one * other / (one + other)
            } else {
                0.0
            }
        };
        let mut join = |one: usize, other: usize, conductance: f64| {
            if conductance > 0.0 {
                matrix.add(one, one, conductance);
                matrix.add(other, other, conductance);
                matrix.add(one, other, -conductance);
            }
        };
        for cell in 0..self.cells() {
            for along in 0..2 {
                let Some(next) = self.next(cell, along) else {
                    continue;
                };
                let distance = 0.5 * (self.width(cell, along) + self.width(next, along));
                let width = self.width(cell, 1 - along);
                for plate in 0..plates {
                    let [one, other] = [cell, next].map(|cell| self.node(cell, plate));
                    let sheet = harmonic(self.sheets[one], self.sheets[other]);
                    let share = harmonic(self.share(cell, plate), self.share(next, plate));
                    join(one, other, sheet * share * width / distance);
                }
            }
            for interface in 0..plates - 1 {
                let area = self.meeting[interface][cell];
                let across = faces.open(size, interface);
                join(
                    self.node(cell, interface),
                    self.node(cell, interface + 1),
                    area * across,
                );
            }
        }
        for (node, conductance) in self.sink(size) {
            matrix.add(node, node, conductance);
        }
        // What no plate covers, and what hangs on nothing, is a node of its own.
        for node in 0..self.count() {
            if matrix.entry(node, node) <= 0.0 {
                matrix.add(node, node, 1.0);
            }
        }
        matrix.factor().map_err(|_| Failure::NoPath)
    }

    /// Conductance of the open faces of the first interface, W/K.
    pub(super) fn open_conductance(&self, size: &Size) -> f64 {
        let area: f64 = self.meeting[0].iter().sum();
        area * size.conditions.faces[0].conductance(0.0)
    }

    /// Where one watt enters, node by node; one temperature over a zone is taken as even flux.
    pub(super) fn source(&self, size: &Size) -> Vec<(usize, f64)> {
        let joint = &size.joint;
        let zones = joint.source.zones();
        let whole: f64 = zones.iter().map(|(_, heat)| heat).sum();
        let mut source = Vec::new();
        for (zone, heat) in &zones {
            let areas = self.areas_in(joint, 0, *zone);
            let all: f64 = areas.iter().map(|(_, area)| area).sum();
            source.extend(
                areas
                    .into_iter()
                    .map(|(cell, area)| (self.node(cell, 0), heat / whole * area / all)),
            );
        }
        source
    }

    /// From the mean of the first sheet to the heated face, K/W.
    pub(super) fn entering(&self, size: &Size) -> f64 {
        let joint = &size.joint;
        let zones = joint.source.zones();
        let whole: f64 = zones.iter().map(|(_, heat)| heat).sum();
        zones
            .iter()
            .map(|(zone, heat)| {
                let area: f64 = self
                    .areas_in(joint, 0, *zone)
                    .iter()
                    .map(|(_, area)| area)
                    .sum();
                (heat / whole).powi(2) * size.across(0) / area
            })
            .sum()
    }

    /// Cells with the area that a zone of a plate has in them, m².
    fn areas_in(&self, joint: &Joint, plate: usize, zone: Zone) -> Vec<(usize, f64)> {
        let each = &joint.plates[plate];
        let zone = zone.moved(each.origin);
        let mut areas = Vec::new();
        for cell in 0..self.cells() {
            if self.area[self.node(cell, plate)] <= 0.0 {
                continue;
            }
            let points = self.points(cell);
            let inside = points
                .iter()
                .filter(|point| each.covers(**point) && holds(zone, **point))
                .count();
            if inside > 0 {
                let area = self.cell_area(cell) * inside as f64 / points.len() as f64;
                areas.push((cell, area));
            }
        }
        // A zone that falls between all points still takes its heat somewhere.
        if areas.is_empty()
            && let Zone::Rectangle { centre, .. } | Zone::Disc { centre, .. } = zone
        {
            let distance = |cell: &usize| {
                let at = self.centre(*cell);
                (at[0] - centre[0]).hypot(at[1] - centre[1])
            };
            let covered = (0..self.cells()).filter(|cell| self.area[self.node(*cell, plate)] > 0.0);
            let nearest = covered.min_by(|one, other| distance(one).total_cmp(&distance(other)));
            areas.extend(nearest.map(|cell| (cell, self.cell_area(cell))));
        }
        areas
    }

    /// Conductance of the nodes of the last plate to the coolant, W/K.
    fn sink(&self, size: &Size) -> Vec<(usize, f64)> {
        let joint = &size.joint;
        let last = self.plates() - 1;
        let across = size.across(last);
        let back = |zone: Zone, film: f64| -> Vec<(usize, f64)> {
            let conductance = (film.recip() + across).recip();
            self.areas_in(joint, last, zone)
                .into_iter()
                .map(|(cell, area)| (self.node(cell, last), area * conductance))
                .collect()
        };
        let parts = match &joint.sink {
            Cooling::Whole(Sink::IsothermalBack) => return back(Zone::Face, f64::INFINITY),
            Cooling::Whole(Sink::Film(film)) => return back(Zone::Face, *film),
            Cooling::Whole(Sink::Rim) => return self.edges(last, None),
            Cooling::Parts(parts) => parts,
        };
        let temperature = joint.service.cases[0].temperature;
        let each = parts.iter().flat_map(|part| match *part {
            CooledPart::Film { zone, coefficient } => back(zone, coefficient),
            CooledPart::Held(zone) => back(zone, f64::INFINITY),
            CooledPart::Edge(edge) => self.edges(last, Some(edge)),
            CooledPart::Rim => self.edges(last, None),
            CooledPart::Radiation { emissivity } => {
                back(Zone::Face, radiative_film(emissivity, temperature))
            }
        });
        each.collect()
    }

    /// From the coolant to the mean sink surface per watt, where a film covers the whole back, K/W.
    pub(super) fn film_drop(&self, size: &Size) -> f64 {
        match size.joint.sink {
            Cooling::Whole(Sink::Film(film)) => {
                let last = self.plates() - 1;
                let cells = 0..self.cells();
                let area: f64 = cells.map(|cell| self.area[self.node(cell, last)]).sum();
                (film * area).recip()
            }
            _ => 0.0,
        }
    }

    /// Conductance of the nodes along an edge of a plate, all round without one, to that edge, W/K.
    fn edges(&self, plate: usize, edge: Option<Edge>) -> Vec<(usize, f64)> {
        let mut found = Vec::new();
        for cell in 0..self.cells() {
            let node = self.node(cell, plate);
            if self.area[node] <= 0.0 {
                continue;
            }
            for along in 0..2 {
                let axis = if along == 1 {
                    self.inner
                } else {
                    1 - self.inner
                };
                let before = (0..2).map(|side| (side, self.beside(cell, (along, side))));
                for (side, beside) in before {
                    let ends = beside.is_none_or(|cell| self.area[self.node(cell, plate)] <= 0.0);
                    let meant = match (edge, axis, side) {
                        (None, ..)
                        | (Some(Edge::Left), 0, 0)
                        | (Some(Edge::Right), 0, 1)
                        | (Some(Edge::Lower), 1, 0)
                        | (Some(Edge::Upper), 1, 1) => true,
                        (Some(_), ..) => false,
                    };
                    if ends && meant {
                        let shape = self.width(cell, 1 - along) / (0.5 * self.width(cell, along));
                        found.push((node, self.sheets[node] * shape));
                    }
                }
            }
        }
        found
    }

    /// The cell before (0) or after (1) one along a loop.
    fn beside(&self, cell: usize, (along, side): (usize, usize)) -> Option<usize> {
        if side == 1 {
            return self.next(cell, along);
        }
        if along == 1 {
            (!cell.is_multiple_of(self.rows())).then(|| cell - 1)
        } else {
            cell.checked_sub(self.rows())
        }
    }

    /// Means of the first and the last plate, as weights of their difference.
    pub(super) fn node_to_node(&self) -> Vec<(usize, f64)> {
        let last = self.plates() - 1;
        let mean = |plate: usize, sign: f64| {
            let nodes = (0..self.cells()).map(move |cell| self.node(cell, plate));
            let all: f64 = nodes.clone().map(|node| self.area[node]).sum();
            nodes
                .map(|node| (node, sign * self.area[node] / all))
                .collect::<Vec<(usize, f64)>>()
        };
        [mean(0, 1.0), mean(last, -1.0)].concat()
    }

    /// Mean difference across the first interface, as weights.
    pub(super) fn interface_drop(&self) -> Vec<(usize, f64)> {
        let all: f64 = self.meeting[0].iter().sum();
        let cells = self.meeting[0].iter().enumerate();
        cells
            .filter(|(_, area)| **area > 0.0)
            .flat_map(|(cell, area)| {
                let share = area / all;
                [(self.node(cell, 0), share), (self.node(cell, 1), -share)]
            })
            .collect()
    }

    /// Highest temperature of the first sheet.
    pub(super) fn hottest(&self, field: &[f64]) -> f64 {
        let nodes = (0..self.cells()).map(|cell| self.node(cell, 0));
        nodes
            .filter(|node| self.area[*node] > 0.0)
            .map(|node| field[node])
            .fold(f64::NEG_INFINITY, f64::max)
    }

    /// A watt from one sheet to the next about a place, spread as `1 − r²/ρ²` within a radius ρ.
    pub(super) fn kernel(
        &self,
        interface: usize,
        (place, radius): ([f64; 2], f64),
    ) -> Vec<(usize, f64)> {
        let within: Vec<(usize, f64)> = (0..self.cells())
            .filter_map(|cell| {
                let at = self.centre(cell);
                let share = 1.0
                    - ((at[0] - place[0]).powi(2) + (at[1] - place[1]).powi(2)) / radius.powi(2);
                (share > 0.0).then_some((cell, share))
            })
            .collect();
        let mut kernel = Vec::with_capacity(2 * within.len());
        for (plate, sign) in [(interface, 1.0), (interface + 1, -1.0)] {
            let weight = |(cell, share): &(usize, f64)| share * self.area[self.node(*cell, plate)];
            let all: f64 = within.iter().map(weight).sum();
            for each in &within {
                let weight = weight(each);
                if weight > 0.0 {
                    kernel.push((self.node(each.0, plate), sign * weight / all));
                }
            }
        }
        kernel
    }
}

/// Grid lines from the outer bounds through the common ones.
fn lines([from, low, high, to]: [f64; 4], cell: f64) -> Vec<f64> {
    let mark = |at: f64, spacing: f64| Mark { at, spacing };
    let widest = WIDEST * cell;
    let mut lines = vec![from];
    let mut stretch = |marks: [Mark; 2], growth: f64, widest: f64| {
        if marks[1].at - marks[0].at > 1e-3 * cell {
            let further = graded(marks, growth, widest);
            lines.extend(&further[1..]);
        } else if let Some(last) = lines.last_mut() {
            *last = marks[1].at;
        }
    };
    stretch([mark(from, widest), mark(low, cell)], GROWTH, widest);
    stretch([mark(low, cell), mark(high, cell)], 1.0, cell);
    stretch([mark(high, cell), mark(to, widest)], GROWTH, widest);
    lines
}

fn holds(zone: Zone, point: [f64; 2]) -> bool {
    match zone {
        Zone::Face => true,
        Zone::Rectangle { centre, size } => {
            (0..2).all(|k| (point[k] - centre[k]).abs() <= 0.5 * size[k])
        }
        Zone::Disc { centre, radius } => {
            (point[0] - centre[0]).hypot(point[1] - centre[1]) <= radius
        }
    }
}
