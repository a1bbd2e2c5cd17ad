//! Contact and heat of one bolt in the middle of two discs, in radius and height.

mod readings;
mod shape;
mod temperatures;

use std::sync::{Arc, Mutex, PoisonError};

use crate::{
    estimate::{
        Failure, Flatness, RingRow, Watch,
        chain::{
            conditions::Conditions,
            elastic::{
                columns::Columns,
                level::Level,
                solver::{Factors, Solved, Solver},
                variant::Variant,
            },
        },
    },
    joint::Joint,
    pressure::{
        elastic,
        round::{self, NotConverged, Solution},
    },
    resistance::round::{self as heat, Condensed, Law},
};

use shape::Shape;

/// What bounds the form of the field; faces whose asperities yield are for the columns.
///
/// On the reference joint of the tests, by columns, such faces changed what the joint adds by −5 % in
/// vacuum, where rigid heads do more, and by +1 % in air.
const FORMS: [Variant; 2] = [Variant::OtherHeads, Variant::OtherFriction];

/// One bolt in round plates, with what is solved of it so far.
#[derive(Debug)]
pub(super) struct Round {
    shape: Shape,
    /// What the columns may take where a variation is round no more, bytes.
    most_bytes: u64,
    watch: Watch,
    /// Contacts per unit of force: they serve any torque.
    contacts: Mutex<Vec<(round::Problem, Arc<Solution>)>>,
    /// Plates condensed to their faces: they serve any torque and medium.
    plates: Mutex<Vec<(heat::Problem, Arc<Condensed>)>>,
}

/// The pair under one load.
#[derive(Debug)]
struct InRound {
    shape: Shape,
    contact: Arc<Solution>,
    force: f64,
    rings: Vec<RingRow>,
    heat: heat::Heat,
    /// Radius, m, and flux across the faces, 1/m².
    flux: Vec<(f64, f64)>,
}

impl Round {
    /// The pair of a joint; none where the joint is not round in every respect.
    ///
    /// Its few thousand unknowns take less memory than the program itself at any resolution, so that no
    /// limit is asked of them: the bytes are for the columns of a variation that is round no more.
    pub(super) fn of(joint: &Joint, most_bytes: u64, watch: &Watch) -> Option<Self> {
        Some(Self {
            shape: Shape::of(joint)?,
            most_bytes,
            watch: watch.clone(),
            contacts: Mutex::new(Vec::new()),
            plates: Mutex::new(Vec::new()),
        })
    }
}

impl Solver for Round {
    fn solved(
        &self,
        joint: &Joint,
        (level, variant): (Level, Variant),
        (conditions, factors): (&Conditions, &Factors),
    ) -> Result<Arc<dyn Solved>, Failure> {
        let problem = self.shape.contact(joint, (level, variant));
        let contact = kept(&self.contacts, &problem, || {
            round::solve(&problem).map_err(unsolved)
        })?;
        let conductivity = factors.conductivity(conditions);
        let conductivity = [conductivity[0], conductivity[conductivity.len() - 1]];
        let problem = self
            .shape
            .heat(contact.contact_radius, (conductivity, conditions.shanks[0]));
        let plates = kept(&self.plates, &problem, || {
            heat::condense(&problem).map_err(Failure::Heat)
        })?;
        let force = conditions.forces[0];
        let faces = &conditions.faces[0];
        let touching = faces.over_many_points(contact.peak(force));
        let law = Law {
            closed: |pressure| factors.touching * touching(pressure),
            parted: |gap| factors.parted * faces.local.parted(gap),
        };
        let local = |radius| law.at(&contact, [force, radius]);
        let heat = plates.solve(local).map_err(Failure::Heat)?;
        heat.path
            .checked("heat through the round plates")
            .map_err(Failure::Heat)?;
        Ok(Arc::new(InRound {
            shape: self.shape,
            force,
            rings: readings::rings(&self.shape, (&contact, force), local),
            flux: temperatures::flux(&heat, local),
            heat,
            contact,
        }))
    }

    /// Flat faces need no table: their field is a multiple of itself.
    fn tabulate(&self, _: &Joint, _: Level, _: (&[f64], [f64; 2])) -> Result<(), Failure> {
        Ok(())
    }

    /// Contacts and plates are kept under their problems: all that is known goes along.
    fn remade(&self, joint: &Joint, _: bool) -> Result<Arc<dyn Solver>, Failure> {
        let Some(shape) = Shape::of(joint) else {
            let columns = Columns::new(joint, self.most_bytes, &self.watch)?;
            return Ok(Arc::new(columns));
        };
        Ok(Arc::new(Self {
            shape,
            most_bytes: self.most_bytes,
            watch: self.watch.clone(),
            contacts: Mutex::new(known(&self.contacts)),
            plates: Mutex::new(known(&self.plates)),
        }))
    }

    fn lent(&self, joint: &Joint) -> Result<Arc<dyn Solver>, Failure> {
        self.remade(joint, true)
    }

    fn forms(&self, _: &Joint) -> &'static [Variant] {
        &FORMS
    }

    /// Faces that are not flat are for the columns.
    fn flatness(&self, _: &Joint, _: Level, _: &Conditions) -> Result<Flatness, Failure> {
        Ok(Flatness::Flat)
    }
}

/// All that is kept so far.
fn known<T: Clone>(kept: &Mutex<Vec<T>>) -> Vec<T> {
    let held = kept.lock().unwrap_or_else(PoisonError::into_inner);
    held.clone()
}

/// What is kept under a key, or made and kept.
///
/// Two threads may make the same; waiting for each other would cost more.
fn kept<K: Copy + PartialEq, V>(
    known: &Mutex<Vec<(K, Arc<V>)>>,
    key: &K,
    make: impl FnOnce() -> Result<V, Failure>,
) -> Result<Arc<V>, Failure> {
    let find = |known: &[(K, Arc<V>)]| {
        let found = known.iter().find(|(each, _)| each == key);
        found.map(|(_, value)| value.clone())
    };
    let held = || known.lock().unwrap_or_else(PoisonError::into_inner);
    if let Some(found) = find(&held()) {
        return Ok(found);
    }
    let made = Arc::new(make()?);
    held().push((*key, made.clone()));
    Ok(made)
}

fn unsolved(fault: NotConverged) -> Failure {
    Failure::Contact(elastic::Failure::NotConverged {
        solver: fault.solver,
        iterations: fault.iterations,
        residual: fault.residual,
    })
}
