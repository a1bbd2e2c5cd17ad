//! Heat through the plates on the grid of the contact.

use std::sync::{Arc, Mutex, OnceLock, PoisonError};

use crate::{
    estimate::chain::{
        conditions::Conditions,
        elastic::{
            columns::{problem::Order, sandwich, terminals::Ends},
            solver::Factors,
        },
    },
    joint::Joint,
    pressure::elastic::{Field, Mesh},
    resistance::{
        self, Path,
        columns::{
            Body, Conduction, Conductivity, Heat, Meeting, Perfect, Placed, Stack, Terminals, nodal,
        },
    },
};

/// Temperatures nearer to each other are the same, K.
const SAME: f64 = 1e-9;

/// The plates as heat meets them.
#[derive(Debug)]
pub(super) struct Plates {
    pub(super) stack: Arc<Stack>,
    pub(super) terminals: Ends,
    /// Conductivity through every plate over that in its plane.
    through: Vec<f64>,
    /// Source, sinks and bolts on the columns, as they were met first.
    placed: OnceLock<Placed>,
    /// Perfect contact met so far, with the sink temperature where the back radiates, K.
    perfect: Mutex<Vec<(f64, Perfect)>>,
}

/// Local conductance of every column of every part of every interface, W/(m² K).
pub(super) type Conductances = Vec<Vec<Vec<f64>>>;

impl Plates {
    pub(super) fn new(
        joint: &Joint,
        order: Order,
        mesh: &Mesh,
    ) -> Result<Self, resistance::Failure> {
        let mut bodies: Vec<Body> = mesh.bodies.iter().map(Body::from).collect();
        let mut faces: Vec<Vec<Meeting>> = (0..mesh.faces.len())
            .map(|interface| Meeting::of(mesh, interface))
            .collect();
        if order == Order::Reversed {
            let nodes: Vec<usize> = bodies.iter().map(Body::nodes).collect();
            for (face, parts) in faces.iter_mut().enumerate() {
                for part in parts {
                    // Upside down the lower body lies on top, and nodes count from the other face.
                    (part.upper, part.lower) = (
                        nodes[face + 1] - 1 - part.lower,
                        nodes[face] - 1 - part.upper,
                    );
                }
            }
            faces.reverse();
            bodies.reverse();
            for body in &mut bodies {
                body.layers.reverse();
            }
        }
        let mut stack = Stack::new(mesh.plan.clone(), bodies)?;
        for (interface, parts) in faces.into_iter().enumerate() {
            stack = stack.meeting(interface, parts)?;
        }
        for index in 0..joint.plates.len() {
            let of_mesh = &mesh.bodies[order.plate(index, joint.plates.len())];
            for (layer, parts) in sandwich::parts((joint, index), of_mesh) {
                stack = stack.made_of((index, layer), parts)?;
            }
        }
        Ok(Self {
            stack: Arc::new(stack),
            terminals: Ends::of(joint),
            through: joint
                .plates
                .iter()
                .map(|plate| plate.material.through_ratio())
                .collect(),
            placed: OnceLock::new(),
            perfect: Mutex::new(Vec::new()),
        })
    }

    /// The same plates, with a memory of their own that holds what is known now.
    pub(super) fn lent(&self) -> Self {
        let known = self.perfect.lock().unwrap_or_else(PoisonError::into_inner);
        Self {
            stack: self.stack.clone(),
            terminals: self.terminals.clone(),
            through: self.through.clone(),
            placed: self.placed.clone(),
            perfect: Mutex::new(known.clone()),
        }
    }

    /// Heat and path under conductances of the faces.
    pub(super) fn solve(
        &self,
        conductances: &Conductances,
        in_plane: &[f64],
        conditions: &Conditions,
    ) -> Result<(Heat, Path), resistance::Failure> {
        let conductivity = self.conductivity(in_plane);
        let terminals = self.terminals.under(conditions);
        let placed = self.placed(&terminals)?;
        // Each load starts afresh, so that the order of the threads moves no digit.
        let mut conduction = Conduction::placed(&placed, &conductivity)?;
        let (heat, perfect) = rayon::join(
            || conduction.solve(conductances),
            || self.perfect(conditions, (&terminals, &conductivity)),
        );
        let (heat, perfect) = (heat?, perfect?);
        let floor = if has_feet(conductances) {
            Some(conduction.solve(&bridged(conductances))?.source_to_sink)
        } else {
            None
        };
        let path = self.path(&heat, (&perfect, floor))?;
        Ok((heat, path))
    }

    /// Terminals on the columns: zones and rings are put there once.
    pub(super) fn placed(&self, terminals: &Terminals) -> Result<Placed, resistance::Failure> {
        if let Some(known) = self.placed.get().and_then(|known| known.under(terminals)) {
            return Ok(known);
        }
        let placed = Placed::new(&self.stack, terminals)?;
        // A back that radiates about another temperature is another terminal: the first one stays.
        Ok(
            match self.placed.get_or_init(|| placed.clone()).under(terminals) {
                Some(known) => known,
                None => placed,
            },
        )
    }

    /// The path of a solution beside perfect contact, and beside perfect feet where there are some.
    pub(super) fn path(
        &self,
        heat: &Heat,
        (perfect, floor): (&Perfect, Option<f64>),
    ) -> Result<Path, resistance::Failure> {
        let mut path = heat.path(perfect);
        if let Some(floor) = floor {
            // What crosses beside feet is not the joint's to improve: it stays under perfect feet.
            path.perfect_contact = floor;
            path.added_by_joint = path.source_to_sink - floor;
            path.resistance_lower = floor.max(heat.one_dimensional);
        }
        if self.terminals.radiates() {
            // What lies beyond the slope of a radiating back is no coolant.
            path.coolant_drop = None;
        }
        path.checked("heat through the columns")?;
        Ok(path)
    }

    pub(super) fn conductivity(&self, in_plane: &[f64]) -> Vec<Conductivity> {
        let plates = in_plane.iter().zip(&self.through);
        plates
            .map(|(k, ratio)| Conductivity::layered(*k, ratio * k))
            .collect()
    }

    pub(super) fn perfect(
        &self,
        conditions: &Conditions,
        (terminals, conductivity): (&Terminals, &[Conductivity]),
    ) -> Result<Perfect, resistance::Failure> {
        // Where nothing radiates one perfect contact serves all temperatures.
        let temperature = if self.terminals.radiates() {
            conditions.temperature
        } else {
            0.0
        };
        let known = || self.perfect.lock().unwrap_or_else(PoisonError::into_inner);
        let serves = |(at, perfect): &&(f64, Perfect)| {
            (at - temperature).abs() < SAME && perfect.serves(terminals, conductivity)
        };
        if let Some((_, perfect)) = known().iter().find(serves) {
            return Ok(perfect.clone());
        }
        let perfect = Perfect::placed(&self.placed(terminals)?, conductivity)?;
        known().push((temperature, perfect.clone()));
        Ok(perfect)
    }
}

/// What the laws of the faces make of a field.
pub(super) fn conductances(
    field: &Field,
    order: Order,
    (conditions, factors): (&Conditions, &Factors),
) -> Conductances {
    let mut found: Conductances = field
        .faces
        .iter()
        .enumerate()
        .map(|(index, face)| {
            let laws = &conditions.faces[order.plate(index, field.faces.len())];
            let contact = &field.mesh.faces[index].contact;
            let pressures = nodal(&field.mesh.plan, contact, &face.pressure);
            let highest = pressures.iter().copied().fold(0.0, f64::max);
            let touching = laws.over_many_points(highest);
            let parted = |gap: f64| factors.parted * laws.local.parted(gap);
            let columns = pressures.iter().zip(&face.gap).zip(&face.weight);
            let own = columns
                .enumerate()
                .map(|(column, ((pressure, gap), weight))| {
                    if *weight <= 0.0 {
                        0.0
                    } else if face.pressure[column] > 0.0 {
                        factors.touching * touching(*pressure)
                    } else {
                        parted(*gap)
                    }
                })
                .collect();
            let open = face.open_gap.iter().zip(&face.open_weight);
            let open: Vec<f64> = open
                .map(|(gap, weight)| if *weight > 0.0 { parted(*gap) } else { 0.0 })
                .collect();
            if face.open_weight.iter().any(|weight| *weight > 0.0) {
                vec![own, open]
            } else {
                vec![own]
            }
        })
        .collect();
    if order == Order::Reversed {
        found.reverse();
    }
    found
}

/// Whether faces meet beside feet anywhere.
pub(super) fn has_feet(conductances: &Conductances) -> bool {
    conductances.iter().any(|parts| parts.len() > 1)
}

/// The same with faces that touch as good as perfectly; what lies beside feet stays.
pub(super) fn bridged(conductances: &Conductances) -> Conductances {
    /// Far beyond what any plate passes on; what it leaves is below 1e-4 of a millimetre of metal.
    const AS_GOOD_AS_PERFECT: f64 = 1e9;
    let mut found = conductances.clone();
    for touching in found.iter_mut().filter_map(|parts| parts.first_mut()) {
        for value in touching {
            *value = AS_GOOD_AS_PERFECT;
        }
    }
    found
}
