//! The chain on closed forms and networks: cones, ring sums, plan grid.

use std::{
    borrow::Cow,
    sync::{Arc, OnceLock},
};

use crate::{
    diagnostic::Caution,
    estimate::{
        Chain, Failure, PressureResult, Realisation, RingRow,
        chain::{
            Model,
            conditions::Conditions,
            elastic::moved,
            form::with_form,
            geometry::Geometry,
            levels::Level,
            remade::{Remade, Remaker, Stated},
        },
    },
    joint::{Bounds, Joint},
    pressure::{Cone, Pair},
    resistance::{Cells, Path},
};

/// The closed-form field on networks.
#[derive(Clone, Debug)]
pub(super) struct ConeModel {
    /// Shared with the chains of other torques.
    pub(super) geometry: Arc<Geometry>,
    /// What the plan grid makes of the cells' answer, for each case; none without a grid.
    levels: Vec<Level>,
    /// Model form, as a factor on what the joint adds.
    form: Bounds,
    /// What stated values do that make another joint, for each case, once it has been asked for; empty
    /// where there are none.
    remade: Vec<Arc<OnceLock<Arc<Remade>>>>,
}

/// A case whose joint is solved under other values.
struct Beside<'a> {
    model: &'a ConeModel,
    chain: &'a Chain<'a>,
    case: usize,
}

impl ConeModel {
    pub(super) fn new(joint: &Joint) -> Result<Self, Failure> {
        Ok(Self {
            geometry: Arc::new(Geometry::new(joint)?),
            levels: Vec::new(),
            form: Bounds::exact(1.0),
            remade: Vec::new(),
        })
    }

    /// The same plates with calibration and model form for the forces and the medium of a chain.
    pub(super) fn levelled(&self, chain: &Chain) -> Result<Self, Failure> {
        let remakes = !chain.joint().remaking().is_empty();
        let cases = chain.joint().service.cases.len();
        Ok(Self {
            remade: if remakes {
                (0..cases).map(|_| Arc::default()).collect()
            } else {
                Vec::new()
            },
            levels: self.calibrated(chain, &self.levels)?,
            form: self.form_bounds(chain)?,
            geometry: self.geometry.clone(),
        })
    }

    pub(super) fn cells(&self) -> &Cells {
        &self.geometry.cells
    }

    pub(super) fn cones(&self) -> &[Cone] {
        &self.geometry.cones
    }

    /// The path of a case at one realisation, model form applied.
    pub(super) fn path(
        &self,
        chain: &Chain,
        case: usize,
        (conditions, at): (&Conditions, &Realisation),
    ) -> Result<Path, Failure> {
        let path = self.alone(case, conditions, at);
        if at.stated.is_empty() {
            return Ok(path);
        }
        let Some(remade) = self.remade(chain, case)? else {
            return Ok(path);
        };
        let whole = |forces: &[f64]| forces.iter().sum::<f64>();
        let nominal = whole(&chain.nominal_forces(case, chain.joint()));
        let force = (whole(&conditions.forces) / nominal).ln();
        Ok(moved(&path, &remade.shift(force, &at.stated)))
    }

    /// What stated values of a case do that make another joint; none where there are none.
    ///
    /// Two threads may work it out at once; waiting for each other could take for ever, since it is
    /// worked out on all cores.
    fn remade(&self, chain: &Chain, case: usize) -> Result<Option<&Remade>, Failure> {
        let Some(slot) = self.remade.get(case) else {
            return Ok(None);
        };
        if slot.get().is_none() {
            let forces = chain.nominal_forces(case, chain.joint());
            let nominal: f64 = forces.iter().sum();
            // Forces are counted over the nominal one.
            if nominal <= 0.0 {
                return Err(chain.open(case, &forces));
            }
            let beside = Beside {
                model: self,
                chain,
                case,
            };
            let range = chain.force_range(case, nominal);
            if let Some(found) = Remade::through(chain.joint(), range, &beside)? {
                slot.get_or_init(|| Arc::new(found));
            }
        }
        Ok(slot.get().map(Arc::as_ref))
    }

    /// Works out what the draws of a case need.
    pub(super) fn expect_draws(&self, chain: &Chain, case: usize) -> Result<(), Failure> {
        self.remade(chain, case).map(|_| ())
    }

    /// Error of what the draws of a case read between solved joints, where they do.
    pub(super) fn draw_error(&self, case: usize) -> Option<f64> {
        Some(self.remade.get(case)?.get()?.error)
    }

    /// The path without the stated values that make another joint.
    fn alone(&self, case: usize, conditions: &Conditions, at: &Realisation) -> Path {
        let solved = self.cells().solve(&self.clamped(conditions).load());
        let mut path = match self.levels.get(case) {
            Some(level) => level.calibration.applied(solved),
            None => solved,
        };
        if !self.all_clamp(conditions) {
            let known = std::mem::take(&mut path.contact_per_bolt);
            path.contact_per_bolt = vec![0.0; conditions.forces.len()];
            for (bolt, contact) in self.geometry.clamping.iter().zip(known) {
                path.contact_per_bolt[*bolt] = contact;
            }
        }
        with_form(path, self.form.at(at.field))
    }

    fn all_clamp(&self, conditions: &Conditions) -> bool {
        self.geometry.clamping.len() == conditions.forces.len()
    }

    /// Conditions as the networks take them: those of the bolts that are there.
    pub(super) fn clamped<'a>(&self, conditions: &'a Conditions) -> Cow<'a, Conditions> {
        if self.all_clamp(conditions) {
            return Cow::Borrowed(conditions);
        }
        Cow::Owned(Conditions {
            forces: self.clamping(&conditions.forces),
            shanks: self.clamping(&conditions.shanks),
            ..conditions.clone()
        })
    }

    /// Values of the bolts that are there, of the values of all.
    pub(super) fn clamping(&self, values: &[f64]) -> Vec<f64> {
        let clamping = self.geometry.clamping.iter();
        clamping.map(|bolt| values[*bolt]).collect()
    }

    /// Place among the bolts that are there; none for one that is missing.
    fn place(&self, bolt: usize) -> Option<usize> {
        self.geometry.clamping.binary_search(&bolt).ok()
    }

    /// Radius where the contact of a bolt ends, m; 0 where the bolt is missing.
    pub(super) fn contact_radius(&self, bolt: usize) -> f64 {
        self.place(bolt)
            .map_or(0.0, |place| self.cones()[place].contact_radius)
    }

    /// The rings around a bolt; none where it is missing.
    pub(super) fn rings(&self, conditions: &Conditions, bolt: usize) -> Vec<RingRow> {
        let clamped = self.clamped(conditions);
        self.place(bolt)
            .map_or_else(Vec::new, |place| self.cells().rings(&clamped.load(), place))
    }

    /// The pressure field under the forces of the bolts, N.
    pub(super) fn pressure(&self, forces: &[f64]) -> PressureResult {
        let cells = self.cells();
        let forces = &self.clamping(forces);
        PressureResult {
            peak: cells.peak_pressure(forces),
            contact_area: cells.contact_area(),
            radius_95: cells.radius_holding(0.95, forces),
            force: cells.force_carried(forces),
            gap_max: None,
            gap_mean: None,
            solved: None,
        }
    }

    /// Cautions of the closed form that do not depend on the force, each once.
    pub(super) fn cautions(&self) -> Vec<Caution> {
        let mut found: Vec<Caution> = Vec::new();
        for caution in self.geometry.pairs.iter().filter_map(Pair::caution) {
            if !found.contains(&caution) {
                found.push(caution);
            }
        }
        found
    }
}

impl Beside<'_> {
    /// The cone of the joint of some values under its conditions at a realisation, forces times a factor
    /// given as its logarithm.
    fn solved(&self, values: &[Stated], at: (&Realisation, &[f64])) -> Result<Vec<Path>, Failure> {
        let through = |model: &ConeModel, chain: &Chain| {
            let (at, forces) = at;
            let conditions = chain.conditions(self.case, at)?;
            let path = |force: &f64| {
                let mut under = conditions.clone();
                for each in &mut under.forces {
                    *each *= force.exp();
                }
                model.alone(self.case, &under, at)
            };
            Ok(forces.iter().map(path).collect())
        };
        if values.is_empty() {
            return through(self.model, self.chain);
        }
        let other = self.chain.remade(values)?;
        match &other.model {
            Model::Cone(model) => through(model, &other),
            Model::Elastic(_) => unreachable!("a cone is remade as a cone"),
        }
    }
}

impl Remaker<Failure> for Beside<'_> {
    fn paths(&self, values: &[Stated], forces: &[f64]) -> Result<Vec<Path>, Failure> {
        self.solved(values, (&Realisation::default(), forces))
    }

    fn probed(&self, values: &[Stated], (force, side): (f64, f64)) -> Result<[Path; 2], Failure> {
        let at = Realisation {
            law: 0.8 * side,
            gas: -0.6 * side,
            conductivity: [-0.6 * side, 0.7 * side],
            ..Realisation::default()
        };
        let solved = |values: &[Stated]| {
            let paths = self.solved(values, (&at, &[force]))?;
            Ok::<Path, Failure>(paths[0].clone())
        };
        Ok([solved(&[])?, solved(values)?])
    }
}
