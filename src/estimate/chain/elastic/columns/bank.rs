//! Fields solved so far, so that no field is solved twice.

use std::sync::{Arc, Mutex, MutexGuard, OnceLock, PoisonError};

use crate::{
    estimate::{
        Failure, Watch,
        chain::elastic::{
            columns::{
                heat::Plates,
                problem::{Order, Task, with_problem},
            },
            level::{Level, coarser, place},
            variant::Variant,
        },
    },
    joint::Joint,
    pressure::elastic::{self, Field, Table},
};

/// Relative difference of two force patterns below which one is the other times a factor.
const SAME_PATTERN: f64 = 1e-9;
/// Share of the clamp force that the faces may miss; more means that nothing holds the plates
/// against each other.
const BALANCE: f64 = 1e-3;
/// Error allowed in the middle of an interval of a table over force; half of it or less is left
/// once the middle is a node.
const TABLE_ERROR: f64 = 0.01;

/// The fields of one joint, for any torque and medium.
#[derive(Debug)]
pub(super) struct Bank {
    pub(super) order: Order,
    pub(super) watch: Watch,
    most_bytes: u64,
    solved: Mutex<Vec<Solved>>,
    /// Tables over the force, with level and the forces at factor 1.
    tables: Mutex<Vec<Tabulated>>,
    plates: [OnceLock<Arc<Plates>>; 4],
}

/// A field that is asked for.
#[derive(Clone, Copy, Debug)]
pub(super) struct Wanted<'a> {
    pub(super) level: Level,
    pub(super) variant: Variant,
    /// Clamp force of each bolt, N.
    pub(super) forces: &'a [f64],
    /// Pressure over closure of the asperities of each interface, Pa/m; none where they do not yield.
    pub(super) asperities: &'a [Option<f64>],
}

/// A table with its level and the forces at factor 1, N.
type Tabulated = (Level, Vec<f64>, Arc<Table>);

/// Where the search for a contact begins.
#[derive(Clone, Debug)]
enum Start {
    Near(Arc<Field>),
    Coarser(Arc<Field>),
    Bolts,
}

#[derive(Clone, Debug)]
struct Solved {
    level: Level,
    variant: Variant,
    forces: Vec<f64>,
    asperities: Vec<Option<f64>>,
    field: Arc<Field>,
}

impl Bank {
    /// An empty bank that may take so many bytes for one field.
    pub(super) fn new(joint: &Joint, most_bytes: u64, watch: &Watch) -> Result<Self, Failure> {
        Ok(Self {
            order: Order::of(joint)?,
            watch: watch.clone(),
            most_bytes,
            solved: Mutex::new(Vec::new()),
            tables: Mutex::new(Vec::new()),
            plates: [const { OnceLock::new() }; 4],
        })
    }

    /// A bank of a joint that differs in thickness, bow, film or gas, with the fields of this one where the
    /// contact is the same.
    pub(super) fn remade(&self, joint: &Joint, same_contact: bool) -> Result<Self, Failure> {
        let bank = Self::new(joint, self.most_bytes, &self.watch)?;
        if same_contact {
            bank.solved().clone_from(&self.solved());
        }
        Ok(bank)
    }

    /// A bank of the same joint with the fields, tables and plates that are known now; what either learns
    /// later stays its own.
    pub(super) fn lent(&self) -> Self {
        let own = |plates: &OnceLock<Arc<Plates>>| match plates.get() {
            Some(known) => OnceLock::from(Arc::new(known.lent())),
            None => OnceLock::new(),
        };
        Self {
            order: self.order,
            // Two that tell on one line would talk across each other.
            watch: Watch::none(),
            most_bytes: self.most_bytes,
            solved: Mutex::new(self.solved().clone()),
            tables: Mutex::new(self.tables().clone()),
            plates: self.plates.each_ref().map(own),
        }
    }

    /// Forgets every field; those in use elsewhere live on there.
    pub(super) fn forget(&self) {
        self.solved().clear();
        self.tables().clear();
    }

    fn tables(&self) -> MutexGuard<'_, Vec<Tabulated>> {
        self.tables.lock().unwrap_or_else(PoisonError::into_inner)
    }

    fn solved(&self) -> MutexGuard<'_, Vec<Solved>> {
        self.solved.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// The wanted field: one that is known, one that is known times a factor, or a new one.
    ///
    /// The contact of flat faces that yield alike does not depend on the force, so a factor is
    /// exact there.
    pub(super) fn field(&self, joint: &Joint, wanted: &Wanted) -> Result<Arc<Field>, Failure> {
        let known: Vec<Solved> = self
            .solved()
            .iter()
            .filter(|each| each.level == wanted.level && each.variant == wanted.variant)
            .cloned()
            .collect();
        for each in &known {
            match factor(&each.forces, wanted.forces) {
                _ if each.asperities != wanted.asperities => {}
                Some(factor) if (factor - 1.0).abs() <= SAME_PATTERN => {
                    return Ok(each.field.clone());
                }
                Some(factor) if wanted.variant.is_flat(joint) => {
                    return Ok(Arc::new(each.field.scaled(factor)));
                }
                _ => {}
            }
        }
        if let Some(field) = self.tabulated(wanted) {
            return Ok(field);
        }
        self.solve(joint, wanted, &known)
    }

    /// A field between those of a table.
    fn tabulated(&self, wanted: &Wanted) -> Option<Arc<Field>> {
        if wanted.variant != Variant::Stated || wanted.asperities.iter().any(Option::is_some) {
            return None;
        }
        self.tables()
            .iter()
            .filter(|(level, ..)| *level == wanted.level)
            .find_map(|(_, base, table)| table.at(factor(base, wanted.forces)?))
    }

    /// Tabulates the field of faces that are not flat over factors on forces, N; flat ones need
    /// no table.
    pub(super) fn tabulate(
        &self,
        joint: &Joint,
        level: Level,
        (forces, range): (&[f64], [f64; 2]),
    ) -> Result<(), Failure> {
        if Variant::Stated.is_flat(joint) {
            return Ok(());
        }
        let hard = vec![None; joint.interfaces()];
        let solve = |factor: f64| {
            let scaled: Vec<f64> = forces.iter().map(|force| force * factor).collect();
            let wanted = Wanted {
                level,
                variant: Variant::Stated,
                forces: &scaled,
                asperities: &hard,
            };
            self.field(joint, &wanted).map_err(|failure| match failure {
                Failure::Contact(found) => found,
                other => elastic::Failure::Unsound {
                    what: other.to_string(),
                },
            })
        };
        let table = Table::over(range, TABLE_ERROR, &solve).map_err(Failure::Contact)?;
        self.watch.tell(&format!(
            "elastic contact over the force: {} fields, off by {:.1e} at most",
            table.len(),
            table.error
        ));
        self.tables()
            .push((level, forces.to_vec(), Arc::new(table)));
        Ok(())
    }

    fn solve(
        &self,
        joint: &Joint,
        wanted: &Wanted,
        known: &[Solved],
    ) -> Result<Arc<Field>, Failure> {
        let task = Task {
            variant: wanted.variant,
            fineness: wanted.level,
            forces: wanted.forces,
            asperities: wanted.asperities,
            most_bytes: self.most_bytes,
            watch: &self.watch,
        };
        let start = self.start(joint, wanted, known)?;
        let field = with_problem(joint, self.order, &task, |problem| match &start {
            Start::Near(field) => elastic::solve_again(problem, field),
            Start::Coarser(field) => elastic::solve_from_coarser(problem, field),
            Start::Bolts => elastic::solve(problem),
        });
        let field = Arc::new(field.map_err(Failure::Contact)?);
        let health = &field.health;
        if health.force_balance.abs() > BALANCE {
            return Err(Failure::Unbalanced {
                share: 1.0 + health.force_balance,
            });
        }
        self.solved().push(Solved {
            level: wanted.level,
            variant: wanted.variant,
            forces: wanted.forces.to_vec(),
            asperities: wanted.asperities.to_vec(),
            field: field.clone(),
        });
        Ok(field)
    }

    /// The nearest known field of the variant, else that of the joint as stated, else of the level
    /// below, which is solved for it: the error of a level asks for it anyway.
    fn start(&self, joint: &Joint, wanted: &Wanted, known: &[Solved]) -> Result<Start, Failure> {
        if let Some(near) = nearest(known, wanted.forces) {
            return Ok(Start::Near(near.field.clone()));
        }
        // Rigid heads have unknowns of their own and rock into their places.
        if !matches!(wanted.variant, Variant::Stated | Variant::OtherHeads) {
            let stated: Vec<Solved> = self
                .solved()
                .iter()
                .filter(|each| each.level == wanted.level && each.variant == Variant::Stated)
                .cloned()
                .collect();
            if let Some(near) = nearest(&stated, wanted.forces) {
                return Ok(Start::Near(near.field.clone()));
            }
        }
        let below = coarser(wanted.level);
        if below == wanted.level || wanted.variant != Variant::Stated {
            return Ok(Start::Bolts);
        }
        let field = self.field(
            joint,
            &Wanted {
                level: below,
                ..*wanted
            },
        );
        Ok(Start::Coarser(field?))
    }

    /// The plates as heat meets them on the grid of a field.
    pub(super) fn plates(
        &self,
        joint: &Joint,
        fineness: Level,
        field: &Field,
    ) -> Result<Arc<Plates>, Failure> {
        let slot = &self.plates[place(fineness)];
        if let Some(plates) = slot.get() {
            return Ok(plates.clone());
        }
        let made = Arc::new(Plates::new(joint, self.order, &field.mesh).map_err(Failure::Plates)?);
        Ok(slot.get_or_init(|| made).clone())
    }
}

/// The factor that makes one set of forces the other; none where they differ in pattern.
fn factor(from: &[f64], to: &[f64]) -> Option<f64> {
    let factor = to.iter().sum::<f64>() / from.iter().sum::<f64>();
    let same = from
        .iter()
        .zip(to)
        .all(|(from, to)| (from * factor - to).abs() <= SAME_PATTERN * to.abs());
    (same && factor.is_finite() && factor > 0.0).then_some(factor)
}

/// The known field whose force as a whole is nearest.
fn nearest<'a>(known: &'a [Solved], forces: &[f64]) -> Option<&'a Solved> {
    let whole: f64 = forces.iter().sum();
    let off = |each: &Solved| (each.forces.iter().sum::<f64>() / whole).ln().abs();
    known
        .iter()
        .min_by(|one, other| off(one).total_cmp(&off(other)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn forces_of_one_pattern_differ_by_a_factor() {
        let off = factor(&[1.0, 2.0], &[3.0, 6.0]).map(|factor| (factor - 3.0).abs());
        assert!(off.is_some_and(|off| off < 1e-12), "{off:?}");
        assert_eq!(factor(&[1.0, 2.0], &[3.0, 5.0]), None);
        assert_eq!(factor(&[1.0], &[0.0]), None);
    }
}
