//! Contact and heat of any joint on columns: the whole plates in three dimensions.

mod bank;
mod edges;
mod heat;
mod many;
mod narrow;
mod problem;
mod readings;
mod sandwich;
mod storeys;
mod temperatures;
mod terminals;

use std::sync::{Arc, OnceLock};

use rayon::prelude::*;

use crate::{
    estimate::{
        Failure, Flatness, Watch,
        chain::{
            conditions::Conditions,
            elastic::{
                level::{GROUND, Level},
                solver::{Factors, Solved, Solver, State},
                variant::Variant,
            },
        },
    },
    joint::{Compliance, Joint},
    pressure::elastic::Field,
    resistance::{Path, columns::Heat},
};

use bank::{Bank, Wanted};
use heat::{Conductances, conductances};
use many::Load;
use problem::Order;
use readings::{initial, shares, widest};

/// What bounds the form of a field on columns.
const FORMS: [Variant; 3] = [
    Variant::OtherHeads,
    Variant::OtherFriction,
    Variant::OtherCompliance,
];

/// Any joint on columns.
#[derive(Debug)]
pub(super) struct Columns {
    bank: Bank,
}

/// A joint on columns under one load.
#[derive(Debug)]
struct OnColumns {
    field: Arc<Field>,
    heat: Heat,
    path: Path,
    /// What narrow zones leave out of source to sink, K/W.
    left_out: f64,
    order: Order,
    /// What touches and what is parted of every interface have in the resistance.
    shares: Vec<[f64; 2]>,
    /// Local conductances of every interface, from warm to cold.
    faces: Conductances,
    /// Pressures for drawings, of every interface of the field.
    shown: Vec<OnceLock<Vec<f64>>>,
}

impl Columns {
    pub(super) fn new(joint: &Joint, memory: u64, watch: &Watch) -> Result<Self, Failure> {
        Ok(Self {
            bank: Bank::new(joint, memory, watch)?,
        })
    }
}

impl Columns {
    fn field(
        &self,
        joint: &Joint,
        (level, variant): (Level, Variant),
        conditions: &Conditions,
    ) -> Result<Arc<Field>, Failure> {
        let asperities: Vec<Option<f64>> = (0..joint.interfaces())
            .map(|interface| asperities((joint, interface), variant, conditions))
            .collect();
        let wanted = Wanted {
            level,
            variant,
            forces: &conditions.forces,
            asperities: &asperities,
        };
        self.bank.field(joint, &wanted)
    }

    /// Solves the contacts of the variants among states side by side, to be found when each is asked for.
    ///
    /// Those of one variant are solved one after the other and start from each other, the first from the
    /// joint as stated, so that variants know nothing of each other and no thread decides where a solution
    /// starts.
    fn variants(&self, joint: &Joint, level: Level, states: &[State]) -> Result<(), Failure> {
        let mut others: Vec<Variant> = Vec::new();
        for state in states {
            if state.variant != Variant::Stated && !others.contains(&state.variant) {
                others.push(state.variant);
            }
        }
        let solve = |state: &State| {
            let task = (level, state.variant);
            self.field(joint, task, &state.conditions).map(|_| ())
        };
        let stated = states.iter().find(|state| state.variant == Variant::Stated);
        stated
            .filter(|_| !others.is_empty())
            .map_or(Ok(()), solve)?;
        let each = |variant: Variant| {
            let mut own = states.iter().filter(|state| state.variant == variant);
            own.try_for_each(solve)
        };
        // Of several failures the first is told, whichever came first.
        let solved: Vec<Result<(), Failure>> = others.into_par_iter().map(each).collect();
        solved.into_iter().collect()
    }
}

impl Solver for Columns {
    fn solved(
        &self,
        joint: &Joint,
        (level, variant): (Level, Variant),
        (conditions, factors): (&Conditions, &Factors),
    ) -> Result<Arc<dyn Solved>, Failure> {
        let field = self.field(joint, (level, variant), conditions)?;
        let plates = self.bank.plates(joint, level, &field)?;
        let faces: Conductances = conductances(&field, self.bank.order, (conditions, factors));
        let (heat, path) = plates
            .solve(&faces, &factors.conductivity(conditions), conditions)
            .map_err(Failure::Heat)?;
        let order = self.bank.order;
        Ok(Arc::new(OnColumns {
            left_out: narrow::left_out(joint, conditions),
            shares: shares((&field, order), &heat, &faces),
            order,
            field,
            heat,
            path,
            shown: faces.iter().map(|_| OnceLock::new()).collect(),
            faces,
        }))
    }

    fn expect(
        &self,
        joint: &Joint,
        task: (Level, Variant),
        conditions: &Conditions,
    ) -> Result<(), Failure> {
        self.field(joint, task, conditions).map(|_| ())
    }

    /// Contacts of one variant are solved one after the other; then the heat of all side by side. So no
    /// thread decides where a solution starts.
    fn paths(&self, joint: &Joint, level: Level, states: &[State]) -> Result<Vec<Path>, Failure> {
        self.variants(joint, level, states)?;
        let order = self.bank.order;
        let mut plates = None;
        let mut loads = Vec::with_capacity(states.len());
        let mut last: Option<(&State, Arc<Field>)> = None;
        for state in states {
            let under = (&state.conditions, &state.factors);
            let same = |(last, _): &&(&State, Arc<Field>)| {
                last.variant == state.variant && last.conditions.forces == state.conditions.forces
            };
            let field = match last.as_ref().filter(same) {
                Some((_, field)) => field.clone(),
                None => self.field(joint, (level, state.variant), under.0)?,
            };
            last = Some((state, field.clone()));
            loads.push(Load {
                faces: conductances(&field, order, under),
                in_plane: state.factors.conductivity(&state.conditions),
                depth: state.depth,
            });
            if plates.is_none() {
                plates = Some(self.bank.plates(joint, level, &field)?);
            }
        }
        let (Some(plates), Some(first)) = (plates, states.first()) else {
            return Ok(Vec::new());
        };
        plates
            .paths(&loads, &first.conditions)
            .map_err(Failure::Heat)
    }

    fn tabulate(
        &self,
        joint: &Joint,
        level: Level,
        range: (&[f64], [f64; 2]),
    ) -> Result<(), Failure> {
        self.bank.tabulate(joint, level, range)
    }

    fn remade(&self, joint: &Joint, same_contact: bool) -> Result<Arc<dyn Solver>, Failure> {
        let bank = self.bank.remade(joint, same_contact)?;
        Ok(Arc::new(Self { bank }))
    }

    fn lent(&self, _: &Joint) -> Result<Arc<dyn Solver>, Failure> {
        let bank = self.bank.lent();
        Ok(Arc::new(Self { bank }))
    }

    fn forget(&self) {
        self.bank.forget();
    }

    fn forms(&self, joint: &Joint) -> &'static [Variant] {
        let layered = (0..joint.interfaces()).all(|interface| joint.is_layered(interface));
        if layered { &FORMS[..2] } else { &FORMS }
    }

    /// Flat and bent faces are solved on the ground level; the ratio of its widest gap to that of
    /// the finer field carries them over.
    fn flatness(
        &self,
        joint: &Joint,
        level: Level,
        conditions: &Conditions,
    ) -> Result<Flatness, Failure> {
        let field = self.field(joint, (level, Variant::Stated), conditions)?;
        let left = widest(&field);
        let height = joint.most_loose_flatness();
        if joint.is_flat() && height <= 0.0 {
            return Ok(Flatness::Flat);
        }
        let ground = |variant: Variant| {
            let field = self.field(joint, (GROUND, variant), conditions)?;
            Ok::<f64, Failure>(widest(&field))
        };
        let stated = ground(Variant::Stated)?;
        // Where a pad fills every gap of the stated faces there is nothing to carry over.
        let carried = if stated > 0.0 { left / stated } else { 1.0 };
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
            initial: initial(joint, (&field, self.bank.order)),
            left,
            flat: carried * ground(Variant::Flat)?,
        })
    }
}

/// Pressure over closure of the asperities at the mean pressure under the heads, Pa/m; none for
/// hard contact, for faces that a filler parts, and where the peaks are pressed flat.
///
/// ```text
/// κ = −dp/dY   at p = Σ F/Σ A_seat
/// ```
///
/// `Y` is the separation of the mean planes by the law of the gap, which ends where the contact
/// takes most of the face: nothing is left to yield there.
fn asperities(
    (joint, interface): (&Joint, usize),
    variant: Variant,
    conditions: &Conditions,
) -> Option<f64> {
    const STEP: f64 = 0.05;
    if variant.compliance(joint) == Compliance::Hard || joint.is_layered(interface) {
        return None;
    }
    let seats: f64 = joint
        .bolts()
        .zip(&conditions.forces)
        .filter(|(_, force)| **force > 0.0)
        .map(|((fastener, _), _)| {
            let seat = fastener.head_seat;
            std::f64::consts::PI * (seat.outer_radius.powi(2) - seat.inner_radius.powi(2))
        })
        .sum();
    let pressure = conditions.forces.iter().sum::<f64>() / seats;
    let local = &conditions.faces[interface].local;
    let closure =
        local.separation(pressure * (1.0 - STEP)) - local.separation(pressure * (1.0 + STEP));
    let stiffness = 2.0 * STEP * pressure / closure;
    (stiffness.is_finite() && stiffness > 0.0).then_some(stiffness)
}
