//! The chain on a solved field: elastic contact of the whole plates, heat on the same grid.

mod bank;
mod heat;
mod problem;
mod readings;
mod response;
mod variant;

use std::sync::{Arc, OnceLock};

use rayon::prelude::*;

use crate::{
    conductance,
    estimate::{
        Chain, Failure, Fineness, Realisation, Watch,
        chain::{conditions::Conditions, form::with_form},
    },
    joint::{Joint, Medium},
    pressure::elastic::{self, Field},
    resistance::{Path, columns::Heat},
};

use bank::{Bank, coarser};
use heat::{Factors, conductances};
use response::{Departure, Gauge, Response};
use variant::{FORMS, Variant, loose_flatness};

/// Surface response and bounds stand on this level; only ratios are taken from it.
const GROUND: elastic::Fineness = elastic::Fineness::Coarse;

/// The solved field of a joint, brought to the forces and the medium of a chain.
#[derive(Clone, Debug)]
pub(super) struct ElasticModel {
    fineness: Fineness,
    /// Shared with the chains of other torques and media.
    bank: Arc<Bank>,
    cases: Vec<Arc<Case>>,
}

/// What one case is at nominal, and what the draws need.
#[derive(Debug)]
struct Case {
    conditions: Conditions,
    field: Arc<Field>,
    heat: Heat,
    path: Path,
    /// Pressures for drawings.
    shown: OnceLock<Vec<f64>>,
    /// Bounds of form and flatness worked out at another force; none where they are this case's own.
    bounds: Option<([f64; 2], [f64; 2])>,
    spread: OnceLock<Result<Spread, Failure>>,
}

/// How the nominal path moves with a draw.
#[derive(Clone, Debug)]
struct Spread {
    gauge: Gauge,
    response: Response,
    /// Model form as a factor on what the joint adds: low and high.
    form: [f64; 2],
    /// Convex and concave as factors on what the joint adds; 1 where no flatness is loose.
    bent: [f64; 2],
}

impl ElasticModel {
    pub(super) fn new(
        joint: &Joint,
        (fineness, memory): (Fineness, u64),
        watch: &Watch,
    ) -> Result<Self, Failure> {
        Ok(Self {
            fineness,
            bank: Arc::new(Bank::new(joint, memory, watch)?),
            cases: Vec::new(),
        })
    }

    /// Solves the nominal state of every case of a chain.
    pub(super) fn levelled(&self, chain: &Chain) -> Result<Self, Failure> {
        let cases = (0..chain.joint().service.cases.len())
            .map(|case| {
                let conditions = chain.conditions(case, &Realisation::default())?;
                chain.refuse_open(case, &conditions.forces)?;
                self.bank
                    .take_asperities(asperities(chain.joint(), &conditions));
                let (field, heat, path) = self.solved(
                    chain,
                    (self.level(), Variant::Stated),
                    (&conditions, &Factors::NONE),
                )?;
                Ok(Arc::new(Case {
                    conditions,
                    field,
                    heat,
                    path,
                    shown: OnceLock::new(),
                    bounds: self.bounds(chain, case),
                    spread: OnceLock::new(),
                }))
            })
            .collect::<Result<Vec<Arc<Case>>, Failure>>()?;
        Ok(Self {
            fineness: self.fineness,
            bank: self.bank.clone(),
            cases,
        })
    }

    /// Error of the surface that the draws are read from, where draws were made.
    pub(super) fn draw_error(&self, case: usize) -> Option<f64> {
        let spread = self.cases.get(case)?.spread.get()?.as_ref().ok()?;
        Some(spread.response.error)
    }

    /// Bounds that the chain this one comes from has worked out for the same medium.
    ///
    /// Bent faces need a contact of their own for every force; what rigid heads or stuck faces do
    /// to the resistance changes little between them, so one set serves the torques of a sweep.
    fn bounds(&self, chain: &Chain, case: usize) -> Option<([f64; 2], [f64; 2])> {
        let parent = self.cases.get(case)?;
        let interface = parent.conditions.faces.local.interface();
        let vacuum = matches!(chain.joint().service.medium, Medium::Vacuum);
        if chain.joint().is_flat() || interface.gas.is_none() != vacuum {
            return None;
        }
        let spread = parent.spread.get()?.as_ref().ok()?;
        Some((spread.form, spread.bent))
    }

    pub(super) fn fineness(&self) -> Fineness {
        self.fineness
    }

    fn level(&self) -> elastic::Fineness {
        match self.fineness {
            Fineness::Fast => elastic::Fineness::Fast,
            Fineness::Normal => elastic::Fineness::Normal,
            Fineness::Fine => elastic::Fineness::Fine,
        }
    }

    /// The path of a case at one realisation.
    pub(super) fn path(
        &self,
        chain: &Chain,
        case: usize,
        (conditions, at): (&Conditions, &Realisation),
    ) -> Result<Path, Failure> {
        let nominal = &self.cases[case];
        if *at == Realisation::default() {
            return Ok(nominal.path.clone());
        }
        let spread = self.spread_of(chain, nominal)?;
        let departure = spread.gauge.departure(conditions);
        let moved = spread.response.applied(&nominal.path, &departure);
        let form = between(spread.form, at.field) * between(spread.bent, at.flatness);
        Ok(with_form(moved, form))
    }

    fn spread_of<'c>(&self, chain: &Chain, case: &'c Case) -> Result<&'c Spread, Failure> {
        case.spread
            .get_or_init(|| self.spread(chain, case))
            .as_ref()
            .map_err(Clone::clone)
    }

    /// Field, heat and path on one level under some conditions.
    fn solved(
        &self,
        chain: &Chain,
        (fineness, variant): (elastic::Fineness, Variant),
        (conditions, factors): (&Conditions, &Factors),
    ) -> Result<(Arc<Field>, Heat, Path), Failure> {
        let joint = chain.joint();
        let field = self
            .bank
            .field(joint, (fineness, variant), &conditions.forces)?;
        let plates = self.bank.plates(joint, fineness, &field)?;
        let faces = conductances(&field, self.bank.order, (conditions, factors));
        let conductivity = [0, 1].map(|k| conditions.conductivity[k] * factors.conductivity[k]);
        let (heat, path) = plates
            .solve(&faces, conductivity, &conditions.shanks)
            .map_err(Failure::Plates)?;
        Ok((field, heat, path))
    }

    /// Everything the draws of a case need, on the ground level.
    fn spread(&self, chain: &Chain, case: &Case) -> Result<Spread, Failure> {
        let (field, _, base) = self.solved(
            chain,
            (GROUND, Variant::Stated),
            (&case.conditions, &Factors::NONE),
        )?;
        let gauge = Gauge::of(
            &case.conditions,
            readings::mean_pressure(&field),
            field.gap_mean(),
        );
        let response = Response::through(|departures| {
            departures
                .par_iter()
                .map(|departure| self.departed(chain, &case.conditions, departure))
                .collect::<Result<Vec<Path>, Failure>>()
        })?;
        if let Some((form, bent)) = case.bounds {
            return Ok(Spread {
                gauge,
                response,
                form,
                bent,
            });
        }
        let ratio = |variant: &Variant| {
            let (_, _, path) = self.solved(
                chain,
                (GROUND, *variant),
                (&case.conditions, &Factors::NONE),
            )?;
            Ok(path.added_by_joint / base.added_by_joint)
        };
        let forms = FORMS
            .par_iter()
            .map(ratio)
            .collect::<Result<Vec<f64>, Failure>>()?;
        let loose = chain
            .joint()
            .plates
            .iter()
            .any(|plate| loose_flatness(plate) > 0.0);
        let bent = if loose {
            [ratio(&Variant::Bent(-1.0))?, ratio(&Variant::Bent(1.0))?]
        } else {
            [1.0; 2]
        };
        Ok(Spread {
            gauge,
            response,
            form: [
                forms.iter().copied().fold(1.0, f64::min),
                forms.iter().copied().fold(1.0, f64::max),
            ],
            bent,
        })
    }

    /// The path on the ground level away from nominal.
    fn departed(
        &self,
        chain: &Chain,
        nominal: &Conditions,
        departure: &Departure,
    ) -> Result<Path, Failure> {
        let [force, touching, parted, warm, cold] = departure.map(f64::exp);
        let conditions = Conditions {
            forces: nominal.forces.iter().map(|each| each * force).collect(),
            ..nominal.clone()
        };
        let factors = Factors {
            touching,
            parted,
            conductivity: [warm, cold],
        };
        let (_, _, path) =
            self.solved(chain, (GROUND, Variant::Stated), (&conditions, &factors))?;
        Ok(path)
    }

    /// Difference of source to sink to the next coarser level, relative.
    pub(super) fn discretisation_error(&self, chain: &Chain) -> Result<f64, Failure> {
        let case = &self.cases[0];
        let (_, _, coarse) = self.solved(
            chain,
            (coarser(self.level()), Variant::Stated),
            (&case.conditions, &Factors::NONE),
        )?;
        Ok((coarse.source_to_sink / case.path.source_to_sink - 1.0).abs())
    }

    /// Tabulates the field of bent faces from the least to the largest factor on the forces of a
    /// case, on the ground level as far as the draws reach; works out what the draws need there.
    pub(super) fn tabulate(
        &self,
        chain: &Chain,
        (case, [low, high]): (usize, [f64; 2]),
    ) -> Result<(), Failure> {
        if chain.joint().is_flat() {
            return Ok(());
        }
        let nominal = &self.cases[case];
        let forces = &nominal.conditions.forces;
        let reach = response::FORCE_REACH;
        self.bank
            .tabulate(chain.joint(), self.level(), (forces, [low, high]))?;
        self.bank
            .tabulate(chain.joint(), GROUND, (forces, [low / reach, high * reach]))?;
        self.spread_of(chain, nominal)?;
        Ok(())
    }

    /// Share of what the gas takes off the joint's resistance.
    pub(super) fn gas_share(&self, chain: &Chain) -> Result<f64, Failure> {
        let case = &self.cases[0];
        let mut empty = case.conditions.clone();
        let mut interface: conductance::Interface = empty.faces.local.interface().clone();
        if interface.gas.is_none() {
            return Ok(0.0);
        }
        interface.gas = None;
        empty.faces.local = interface.prepare();
        let (_, _, path) = self.solved(
            chain,
            (self.level(), Variant::Stated),
            (&empty, &Factors::NONE),
        )?;
        let share = 1.0 - case.path.added_by_joint / path.added_by_joint;
        Ok(if share.is_finite() {
            share.clamp(0.0, 1.0)
        } else {
            1.0
        })
    }
}

/// Pressure over closure of the asperities at the mean pressure under the heads, Pa/m.
///
/// ```text
/// κ = −dp/dY   at p = Σ F/Σ A_seat
/// ```
///
/// `Y` is the separation of the mean planes by the law of the gap.
fn asperities(joint: &Joint, conditions: &Conditions) -> f64 {
    const STEP: f64 = 0.05;
    let seats: f64 = joint
        .bolts()
        .map(|(fastener, _)| {
            let seat = fastener.head_seat;
            std::f64::consts::PI * (seat.outer_radius.powi(2) - seat.inner_radius.powi(2))
        })
        .sum();
    let pressure = conditions.forces.iter().sum::<f64>() / seats;
    let local = &conditions.faces.local;
    let closure =
        local.separation(pressure * (1.0 - STEP)) - local.separation(pressure * (1.0 + STEP));
    2.0 * STEP * pressure / closure
}

/// A factor between its ends: straight from the low one to 1 and on to the high one.
fn between([low, high]: [f64; 2], place: f64) -> f64 {
    if place < 0.0 {
        1.0 + place * (1.0 - low)
    } else {
        1.0 + place * (high - 1.0)
    }
}
