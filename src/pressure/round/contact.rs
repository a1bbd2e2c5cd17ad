//! Two plates joined by unilateral contact on one grid.

use nalgebra::{DMatrix, DVector};

use crate::{
    numerics::{
        banded::NotPositiveDefinite,
        complementarity::{Bound, Optimum, Programme, Sum},
        elements::edge_load,
    },
    pressure::round::{
        FaceFriction, HeadModel, NotConverged, Problem,
        mesh::Mesh,
        plate::{Load, Loaded, Plate},
    },
};

/// The solution on one grid, for bearing radius 1 and mean head pressure 1.
#[derive(Clone, Debug)]
pub(super) struct Contact {
    /// Pressure on the grid lines.
    pub pressure: Vec<f64>,
    /// Mean gap around each grid line, 0 where the faces touch.
    pub gap: Vec<f64>,
    /// Whether a grid line touches.
    pub touches: Vec<bool>,
    /// Relative error of the force carried.
    pub force_balance: f64,
    /// Systems solved by the active set.
    pub iterations: usize,
    /// Unknown displacements and pressures.
    pub unknowns: usize,
}

/// Which unknown stands where: pressures, then shears, then the pressures of both heads.
struct Numbering {
    lines: usize,
    sheared: usize,
    headed: usize,
}

impl Numbering {
    fn count(&self) -> usize {
        self.lines + self.sheared + 2 * self.headed
    }

    /// Unknown that scales a load of a plate; none for the given load.
    fn of(&self, load: Load, plate: usize) -> Option<usize> {
        match load {
            Load::Pressure(line) => Some(line),
            Load::Shear(line) => Some(self.lines + line),
            Load::Head(line) => Some(self.head(plate) + line),
            Load::Uniform => None,
        }
    }

    fn head(&self, plate: usize) -> usize {
        self.lines + self.sheared + plate * self.headed
    }
}

/// Solves the contact on one grid; the expected edge is the first guess of the active set.
pub(super) fn contact(problem: &Problem, mesh: &Mesh) -> Result<Contact, NotConverged> {
    let lines = mesh.radii.len();
    let loaded = Loaded {
        head: problem.head,
        bearing: mesh.bearing,
        sheared: match problem.faces {
            FaceFriction::Frictionless => 0,
            FaceFriction::Stuck => sheared_lines(problem, mesh),
        },
    };
    let numbering = Numbering {
        lines,
        sheared: loaded.sheared,
        headed: match problem.head {
            HeadModel::Uniform => 0,
            HeadModel::Rigid => mesh.bearing + 1,
        },
    };
    let plates = [0, 1].map(|plate| Plate {
        radii: &mesh.radii,
        heights: &mesh.heights[plate],
        poisson: problem.poisson[plate],
        loaded,
    });
    let compliance = compliances(problem, &plates).map_err(|fault| NotConverged {
        solver: "elimination of a plate",
        iterations: fault.row,
        residual: f64::NAN,
    })?;
    let mut programme = Programme {
        matrix: DMatrix::zeros(numbering.count(), numbering.count()),
        offset: DVector::zeros(numbering.count()),
        bounds: bounds(&numbering),
        sums: sums(mesh, &numbering),
    };
    let loads = loaded.loads(lines);
    for (plate, matrix) in compliance.iter().enumerate() {
        let yielding = problem.youngs_modulus[plate].recip();
        // Shear pulls the second plate the other way.
        let sign = |load: Load| match load {
            Load::Shear(_) if plate == 1 => -1.0,
            _ => 1.0,
        };
        for (row, one) in loads.iter().enumerate() {
            let Some(i) = numbering.of(*one, plate) else {
                continue;
            };
            for (column, other) in loads.iter().enumerate() {
                let value = yielding * sign(*one) * sign(*other) * matrix[(row, column)];
                match numbering.of(*other, plate) {
                    Some(j) => programme.matrix[(i, j)] += value,
                    None => programme.offset[i] += value,
                }
            }
        }
    }
    let mut active = vec![true; numbering.count()];
    for (line, active) in active[..lines].iter_mut().enumerate() {
        *active = line < mesh.edge || line + 1 == lines && line == mesh.edge;
    }
    let optimum = programme.solve(active).map_err(|fault| NotConverged {
        solver: "active set of the contact",
        iterations: fault.iterations,
        residual: fault.violated as f64,
    })?;
    let mut contact = read(&optimum, &programme.sums[0], lines);
    contact.unknowns = plates.iter().map(Plate::unknowns).sum::<usize>() + numbering.count();
    Ok(contact)
}

/// Compliance of both plates for Young's modulus 1; computed once where it is the same.
fn compliances(
    problem: &Problem,
    plates: &[Plate; 2],
) -> Result<[DMatrix<f64>; 2], NotPositiveDefinite> {
    let first = plates[0].compliance()?;
    let same = |pair: [f64; 2]| pair[0].to_bits() == pair[1].to_bits();
    let second = if same(problem.thickness) && same(problem.poisson) {
        first.clone()
    } else {
        plates[1].compliance()?
    };
    Ok([first, second])
}

/// Share of the thinner plate, or of the bearing radius, along which stuck faces slip at the edge.
///
/// Unlike stuck plates have no smooth edge at all: pressure and shear would swing without end towards
/// it. Over this length shear is let go, as it would be by any real friction.
const EDGE_SLIP: f64 = 0.02;

/// Number of lines, from the hole on, that can carry shear.
fn sheared_lines(problem: &Problem, mesh: &Mesh) -> usize {
    let end = mesh.radii[mesh.edge];
    if mesh.edge + 1 == mesh.radii.len() {
        return mesh.radii.len();
    }
    let slip = EDGE_SLIP * problem.thickness[0].min(problem.thickness[1]).min(1.0);
    mesh.radii.partition_point(|line| *line < end - slip)
}

fn bounds(numbering: &Numbering) -> Vec<Bound> {
    let shears = (0..numbering.sheared).map(Bound::With);
    let mut bounds = vec![Bound::NotNegative; numbering.lines];
    bounds.extend(shears);
    bounds.resize(numbering.count(), Bound::NotNegative);
    bounds
}

/// The forces: interface and, where the heads are rigid, both heads carry the force.
fn sums(mesh: &Mesh, numbering: &Numbering) -> Vec<Sum> {
    let area = |columns: usize| {
        let mut weight = vec![0.0; columns + 1];
        for column in 0..columns {
            let load = edge_load([mesh.radii[column], mesh.radii[column + 1]]);
            for (side, values) in load.into_iter().enumerate() {
                weight[column + side] += values.iter().sum::<f64>();
            }
        }
        weight
    };
    let total = area(mesh.bearing).iter().sum();
    let sum = |first: usize, weights: &[f64]| {
        let mut weight = DVector::zeros(numbering.count());
        weight.as_mut_slice()[first..first + weights.len()].copy_from_slice(weights);
        Sum { weight, total }
    };
    let mut sums = vec![sum(0, &area(numbering.lines - 1))];
    if numbering.headed > 0 {
        for plate in 0..2 {
            sums.push(sum(numbering.head(plate), &area(mesh.bearing)));
        }
    }
    sums
}

fn read(optimum: &Optimum, force: &Sum, lines: usize) -> Contact {
    let touches = optimum.active[..lines].to_vec();
    let gap = (0..lines)
        .map(|line| {
            if touches[line] {
                0.0
            } else {
                optimum.residual[line] / force.weight[line]
            }
        })
        .collect();
    Contact {
        pressure: optimum.unknowns.as_slice()[..lines].to_vec(),
        gap,
        touches,
        force_balance: force.weight.dot(&optimum.unknowns) / force.total - 1.0,
        iterations: optimum.iterations,
        unknowns: 0,
    }
}
