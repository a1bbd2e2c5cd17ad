//! The screening model: plates as sheets on one grid, bolts as links between them.
//!
//! Without bolts the sheets are one linear system, the same for every layout. It is factored once;
//! each place of a bolt is solved once, and a layout of `n` bolts is `n` equations. The heat of a
//! bolt leaves and enters over a smooth kernel of one radius for all sizes; what happens within it
//! is the matter of [`crate::layout::bolt::Link`].

mod grid;

use std::f64::consts::PI;

use nalgebra::{DMatrix, DVector};
use rayon::prelude::*;

use crate::{
    layout::{Failure, Measure, Size, bolt::Link},
    numerics::banded::Factor,
};
use grid::Grid;

/// Radius of the kernel in grid cells, at least.
const KERNEL_CELLS: f64 = 2.2;
/// Radius of the kernel over that of the widest contact, at least.
const KERNEL_REACH: f64 = 1.05;

/// The joint of a search without its first group, ready for places.
#[derive(Debug)]
pub struct Sheets {
    grid: Grid,
    factor: Factor,
    /// Temperatures per watt from source to coolant without bolts, K/W.
    ground: Vec<f64>,
    /// What a solution is read by.
    readings: Readings,
    kernel: f64,
    /// The bolts that stay, each with its group.
    others: Vec<(usize, Influence)>,
    perfect: f64,
}

/// Weights of the nodes in what is read.
#[derive(Debug)]
struct Readings {
    source: Vec<(usize, f64)>,
    node_to_node: Vec<(usize, f64)>,
    interface: Vec<(usize, f64)>,
    /// From the mean of the first sheet to the heated face, K/W.
    entering: f64,
    /// From the coolant to the mean sink surface, K/W.
    film: f64,
    /// Conductance of the open faces, W/K.
    open: f64,
}

/// What a watt taken from one sheet and given to the next at one place does.
#[derive(Clone, Debug)]
pub struct Influence {
    /// Nodes of the kernel with their weights, for every interface.
    kernel: Vec<Vec<(usize, f64)>>,
    /// Temperatures, K/W, for every interface.
    field: Vec<Vec<f64>>,
    /// The readings of each of these fields.
    read: Vec<[f64; 3]>,
    /// Difference of the sheets without bolts, K/W, for every interface.
    driven: Vec<f64>,
}

/// Links of every group of one size within the kernel; group 0 is arranged.
#[derive(Clone, Debug)]
pub struct Links(Vec<Vec<Link>>);

fn read(weights: &[(usize, f64)], field: &[f64]) -> f64 {
    weights
        .iter()
        .map(|(node, weight)| weight * field[*node])
        .sum()
}

impl Sheets {
    /// Lays the plates of some sizes of one joint on a grid and solves them without bolts.
    ///
    /// Checked: `every_reading_stays_near_the_closed_form_chain`, `two_like_bolts_are_readings_of_their_mirror`.
    pub fn new(sizes: &[Size]) -> Result<Self, Failure> {
        let Some(first) = sizes.first() else {
            return Err(Failure::NoPath);
        };
        let grid = Grid::new(first);
        let factor = grid.factor(first, grid::Faces::AsTheyAre)?;
        let source = grid.source(first);
        let ground = solved(&factor, grid.count(), &source);
        let reach = sizes.iter().flat_map(|size| {
            let groups = 0..size.joint.fasteners.len();
            groups.map(|group| size.contact_radius(group))
        });
        let widest = reach.fold(0.0, f64::max);
        let kernel = (KERNEL_CELLS * grid.cell()).max(KERNEL_REACH * widest);
        let readings = Readings {
            node_to_node: grid.node_to_node(),
            interface: grid.interface_drop(),
            entering: grid.entering(first),
            film: grid.film_drop(first),
            open: grid.open_conductance(first),
            source,
        };
        let met = grid.factor(first, grid::Faces::Met)?;
        let perfect = solved(&met, grid.count(), &readings.source);
        let perfect = read(&readings.source, &perfect);
        let mut sheets = Self {
            grid,
            factor,
            ground,
            readings,
            kernel,
            others: Vec::new(),
            perfect,
        };
        for (group, fastener) in first.joint.fasteners.iter().enumerate().skip(1) {
            for place in &fastener.places {
                sheets.others.push((group, sheets.influence(*place)));
            }
        }
        if sheets.ground.iter().all(|value| value.is_finite()) {
            Ok(sheets)
        } else {
            Err(Failure::NoPath)
        }
    }

    /// The links of a size within the kernel.
    pub fn links(&self, size: &Size) -> Links {
        let groups = 0..size.joint.fasteners.len();
        Links(groups.map(|group| size.links(group, self.kernel)).collect())
    }

    /// What a bolt at a place does.
    pub fn influence(&self, place: [f64; 2]) -> Influence {
        let interfaces = self.grid.plates() - 1;
        let mut influence = Influence {
            kernel: Vec::with_capacity(interfaces),
            field: Vec::with_capacity(interfaces),
            read: Vec::with_capacity(interfaces),
            driven: Vec::with_capacity(interfaces),
        };
        for interface in 0..interfaces {
            let kernel = self.grid.kernel(interface, (place, self.kernel));
            let field = solved(&self.factor, self.grid.count(), &kernel);
            let readings = &self.readings;
            influence.read.push([
                read(&readings.source, &field),
                read(&readings.node_to_node, &field),
                read(&readings.interface, &field),
            ]);
            influence.driven.push(read(&kernel, &self.ground));
            influence.kernel.push(kernel);
            influence.field.push(field);
        }
        influence
    }

    /// The same for many places, in their order.
    pub fn influences(&self, places: &[[f64; 2]]) -> Vec<Influence> {
        places
            .par_iter()
            .map(|place| self.influence(*place))
            .collect()
    }

    /// The judged quantity of a layout, K/W; infinite where no heat flows.
    ///
    /// ```text
    /// (G + R) q = d,   T = T₀ − Σ q_i u_i
    /// ```
    ///
    /// | symbol | quantity | SI unit |
    /// |---|---|---|
    /// | `G` | difference of the sheets at one bolt by a watt through another | K/W |
    /// | `R` | link within the kernel, less what the kernel itself takes | K/W |
    /// | `d`, `T₀` | difference of the sheets, temperatures without bolts | K/W |
    /// | `q`, `u_i` | share of the heat through a bolt, temperatures by a watt through it | 1, K/W |
    pub fn value(&self, bolts: &[&Influence], links: &Links, measure: Measure) -> f64 {
        let all: Vec<(usize, &Influence)> = bolts
            .iter()
            .map(|bolt| (0, *bolt))
            .chain(self.others.iter().map(|(group, bolt)| (*group, bolt)))
            .collect();
        if measure == Measure::Contact {
            let bolts = all.iter().map(|(group, _)| &links.0[*group]);
            let pressed: f64 = bolts.map(|links| links[0].contact).sum();
            return (pressed + self.readings.open).recip();
        }
        let interfaces = self.grid.plates() - 1;
        let order = all.len() * interfaces;
        let mut matrix = DMatrix::zeros(order, order);
        let mut driven = DVector::zeros(order);
        for (i, (group, one)) in all.iter().enumerate() {
            for s in 0..interfaces {
                let row = i * interfaces + s;
                driven[row] = one.driven[s];
                for (j, (_, other)) in all.iter().enumerate().take(i + 1) {
                    for t in 0..interfaces {
                        let column = j * interfaces + t;
                        let value = read(&one.kernel[s], &other.field[t]);
                        matrix[(row, column)] = value;
                        matrix[(column, row)] = value;
                    }
                }
                matrix[(row, row)] += links.0[*group][s].resistance - self.kernel_own(s);
            }
        }
        let Some(flows) = matrix.lu().solve(&driven) else {
            return f64::INFINITY;
        };
        let reading = |which: usize, ground: f64| {
            let taken = all.iter().enumerate().flat_map(|(i, (_, bolt))| {
                (0..interfaces).map(move |s| (i * interfaces + s, bolt.read[s][which]))
            });
            ground - taken.map(|(row, by)| flows[row] * by).sum::<f64>()
        };
        let readings = &self.readings;
        let source = || reading(0, read(&readings.source, &self.ground));
        match measure {
            Measure::SourceToSink => source() + readings.entering - readings.film,
            Measure::Added => source() - self.perfect,
            Measure::NodeToNode => reading(1, read(&readings.node_to_node, &self.ground)),
            Measure::InterfaceDrop => reading(2, read(&readings.interface, &self.ground)),
            Measure::Hottest => {
                let mut field = self.ground.clone();
                for (i, (_, bolt)) in all.iter().enumerate() {
                    for s in 0..interfaces {
                        let flow = flows[i * interfaces + s];
                        for (value, by) in field.iter_mut().zip(&bolt.field[s]) {
                            *value -= flow * by;
                        }
                    }
                }
                self.grid.hottest(&field) + readings.entering - readings.film
            }
            Measure::Contact => f64::NAN,
        }
    }

    /// What the kernel takes of the way from its rim to itself in both sheets, K/W.
    ///
    /// ```text
    /// w = 2/(πρ²)(1 − r²/ρ²):   (11/24)/(2π) Σ 1/(k t)
    /// ```
    ///
    /// Source: own computation, ∫₀¹ (2x² − x⁴)²/x dx = 11/24.
    fn kernel_own(&self, interface: usize) -> f64 {
        let sheets = [interface, interface + 1].map(|plate| self.grid.sheet(plate).recip());
        11.0 / 24.0 / (2.0 * PI) * (sheets[0] + sheets[1])
    }
}

/// Temperatures under heat at some nodes.
fn solved(factor: &Factor, count: usize, heat: &[(usize, f64)]) -> Vec<f64> {
    let mut field = vec![0.0; count];
    for (node, share) in heat {
        field[*node] += share;
    }
    factor.solve(&mut field);
    field
}

#[cfg(test)]
mod tests;
