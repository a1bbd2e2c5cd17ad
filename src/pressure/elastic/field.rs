//! The solved field: pressure and gap at every column of every interface.

use crate::pressure::elastic::{
    Bolt, End, Failure, Mesh, Problem,
    system::{Pairing, System},
};

/// Pressure and gap between bolted bodies.
#[derive(Clone, Debug, PartialEq)]
pub struct Field {
    /// Lines, layers and faying areas that it stands on.
    pub mesh: Mesh,
    /// One for each interface, upper first.
    pub faces: Vec<FaceField>,
    /// Bolts.
    pub bolts: Vec<Place>,
    /// How good the solution is.
    pub health: Health,
    pub(super) state: State,
}

/// A bolt in the plan.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Axis, m.
    pub at: [f64; 2],
    /// Force, N.
    pub force: f64,
    /// Largest hole of all bodies, m.
    pub hole_radius: f64,
    /// Outer radius of head or nut, whichever is larger, m.
    pub bearing_radius: f64,
}

/// Values at the columns of one interface.
#[derive(Clone, Debug, PartialEq)]
pub struct FaceField {
    /// Faying area of every column, m²; 0 in holes, off the overlap and beside feet.
    pub weight: Vec<f64>,
    /// Area of every column over all cells that the faying area reaches into, m².
    pub full_weight: Vec<f64>,
    /// Pressure, Pa, as it came out: columns that hold only a sliver of area carry meaningless
    /// pressures and negligible force.
    pub pressure: Vec<f64>,
    /// Gap, m; 0 where the faces touch and where there is no faying area.
    pub gap: Vec<f64>,
    /// Area of every column beside feet, m².
    pub open_weight: Vec<f64>,
    /// Distance of the plates there, m.
    pub open_gap: Vec<f64>,
}

/// What a solution must satisfy, measured on it.
#[derive(Clone, Debug, PartialEq)]
pub struct Health {
    /// Linear systems solved.
    pub newton_steps: usize,
    /// Iterations of all of them.
    pub cg_iterations: usize,
    /// Unknown displacements.
    pub unknowns: usize,
    /// Columns on every level, coarsest last.
    pub levels: Vec<usize>,
    /// Force carried by an interface over the sum of bolt forces, less 1; the worst interface.
    pub force_balance: f64,
    /// Largest part of a touching column's pressure that its gap contradicts, relative to the peak.
    pub complementarity: f64,
    /// Largest rise of the energy in a step, relative to its size; 0 or less where it always fell.
    pub energy_rise: f64,
    /// Steps that had to be shortened for the energy to fall.
    pub shortened_steps: usize,
    /// Residual of the last solution over the load.
    pub residual: f64,
}

/// Where a later solution may start from.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct State {
    /// Displacements, m.
    pub displacement: Vec<f64>,
    /// Touching columns of every pair of faces.
    pub active: Vec<Vec<bool>>,
}

impl State {
    /// Whether it belongs to equations with such vectors and so many pairs.
    pub fn fits(&self, vector: &[f64], pairs: usize) -> bool {
        self.displacement.len() == vector.len() && self.active.len() == pairs
    }
}

impl Field {
    /// Reads pressures and gaps from the displacements.
    pub(super) fn read(
        problem: &Problem,
        (mesh, system): (Mesh, &System),
        (state, mut health): (State, Health),
    ) -> Result<Self, Failure> {
        let faces: Vec<FaceField> = (0..mesh.faces.len())
            .map(|face| face_field((&mesh, system), &state, face))
            .collect();
        let clamped: f64 = problem.bolts.iter().map(|bolt| bolt.force).sum();
        health.force_balance = 0.0;
        for (interface, face) in faces.iter().enumerate() {
            let force = face.force();
            if force.is_nan() || force <= 0.0 {
                return Err(Failure::NoContact { interface });
            }
            let miss = force / clamped - 1.0;
            if miss.abs() > health.force_balance.abs() {
                health.force_balance = miss;
            }
        }
        health.complementarity = system
            .pairings
            .iter()
            .zip(&state.active)
            .map(|(pairing, active)| contradiction((pairing, system), &state.displacement, active))
            .fold(0.0, f64::max);
        Ok(Self {
            bolts: Self::places(problem),
            mesh,
            faces,
            health,
            state,
        })
    }

    /// The bolts of a problem.
    pub(super) fn places(problem: &Problem) -> Vec<Place> {
        let place = |bolt: &Bolt| Place {
            at: bolt.at,
            force: bolt.force,
            hole_radius: bolt.hole_radii.iter().copied().fold(0.0, f64::max),
            bearing_radius: match bolt.end {
                End::Nut(seat) => bolt.head.outer.max(seat.outer),
                End::Thread { .. } => bolt.head.outer,
            },
        };
        problem.bolts.iter().map(place).collect()
    }

    /// The field under another force: forces, pressures and gaps times a factor.
    ///
    /// Exact where the faces are flat: the contact of a flat joint does not depend on the force.
    #[must_use]
    pub fn scaled(&self, factor: f64) -> Self {
        let mut scaled = self.clone();
        let scale = |values: &mut [f64]| values.iter_mut().for_each(|value| *value *= factor);
        for (face, mesh) in scaled.faces.iter_mut().zip(&self.mesh.faces) {
            scale(&mut face.pressure);
            scale(&mut face.gap);
            // Feet keep their height; only what the bodies add to it follows the force.
            for (gap, height) in face.open_gap.iter_mut().zip(&mesh.open_height) {
                *gap = height + factor * (*gap - height);
            }
        }
        scale(&mut scaled.state.displacement);
        for bolt in &mut scaled.bolts {
            bolt.force *= factor;
        }
        scaled
    }
}

impl FaceField {
    /// Force carried, N.
    pub fn force(&self) -> f64 {
        let pairs = self.weight.iter().zip(&self.pressure);
        pairs.map(|(weight, pressure)| weight * pressure).sum()
    }
}

fn face_field((mesh, system): (&Mesh, &System), state: &State, face: usize) -> FaceField {
    let (pairing, shape) = (&system.pairings[face], &mesh.faces[face]);
    let gap = |column: usize| pairing.gap(&system.operator, &state.displacement, column);
    let columns = 0..mesh.plan.columns();
    let solid = |column: usize| shape.weight[column] > 0.0;
    let pressure = columns.clone().map(|column| {
        if solid(column) {
            pairing.stiffness * (-gap(column)).max(0.0)
        } else {
            0.0
        }
    });
    let gaps = columns.clone().map(|column| {
        if solid(column) {
            gap(column).max(0.0)
        } else {
            0.0
        }
    });
    let [upper, lower] = system.plates[face];
    let open = columns.clone().map(|column| {
        if shape.open_weight[column] > 0.0 {
            let at = |unknown: usize| state.displacement[system.operator.place(column, unknown)];
            let apart = shape.open_height[column] + pairing.opening[column];
            (apart + at(upper) - at(lower)).max(0.0)
        } else {
            0.0
        }
    });
    FaceField {
        pressure: pressure.collect(),
        gap: gaps.collect(),
        open_gap: open.collect(),
        weight: shape.weight.clone(),
        full_weight: shape.full_weight.clone(),
        open_weight: shape.open_weight.clone(),
    }
}

/// Largest closure outside the set or opening inside it, over the largest closure.
pub(super) fn contradiction(
    (pairing, system): (&Pairing, &System),
    displacement: &[f64],
    active: &[bool],
) -> f64 {
    let gap = |column: usize| pairing.gap(&system.operator, displacement, column);
    let (mut worst, mut deepest) = (0.0_f64, f64::MIN_POSITIVE);
    for (column, active) in active.iter().enumerate() {
        if pairing.weight[column] > 0.0 {
            let gap = gap(column);
            deepest = deepest.max(-gap);
            worst = worst.max(if *active { gap } else { -gap });
        }
    }
    worst / deepest
}
