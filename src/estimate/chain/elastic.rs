//! The chain on a solved field: elastic contact and heat of the whole plates.

mod columns;
mod level;
mod response;
mod rings;
mod round;
mod solver;
mod variant;

use std::sync::{Arc, OnceLock};

use rayon::prelude::*;

use crate::{
    conductance,
    estimate::{
        Chain, ConeBeside, Failure, Fineness, Meeting, PressureResult, Realisation, RingRow, Watch,
        chain::{PressedEdge, conditions::Conditions, form::with_form},
    },
    joint::{Joint, Medium},
    resistance::Path,
};

use columns::Columns;
use level::{GROUND, Level, asked, coarser};
use response::{Departure, Gauge, Response};
use round::Round;
use solver::{Factors, Solved, Solver};
use variant::{Variant, loose_flatness};

/// The solved field of a joint, brought to the forces and the medium of a chain.
#[derive(Clone, Debug)]
pub(super) struct ElasticModel {
    fineness: Fineness,
    /// Shared with the chains of other torques and media.
    solver: Arc<dyn Solver>,
    cases: Vec<Arc<Case>>,
}

/// What one case is at nominal, and what the draws need.
#[derive(Debug)]
struct Case {
    /// Its place among the cases.
    index: usize,
    medium: Medium,
    conditions: Conditions,
    solved: Arc<dyn Solved>,
    /// What the chain that this one comes from has worked out for its draws, where it serves here.
    inherited: Option<Arc<Spread>>,
    spread: OnceLock<Result<Arc<Spread>, Failure>>,
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
        let solver: Arc<dyn Solver> = match Round::of(joint) {
            Some(round) => Arc::new(round),
            None => Arc::new(Columns::new(joint, memory, watch)?),
        };
        Ok(Self {
            fineness,
            solver,
            cases: Vec::new(),
        })
    }

    /// Solves the nominal state of every case of a chain.
    pub(super) fn levelled(&self, chain: &Chain) -> Result<Self, Failure> {
        let cases = (0..chain.joint().service.cases.len())
            .map(|case| {
                let conditions = chain.conditions(case, &Realisation::default())?;
                chain.refuse_open(case, &conditions.forces)?;
                let solved = self.solved(
                    chain,
                    (self.level(), Variant::Stated),
                    (&conditions, &Factors::NONE),
                )?;
                Ok(Arc::new(Case {
                    conditions,
                    solved,
                    inherited: self.inherited(chain, case),
                    index: case,
                    medium: chain.joint().service.medium.clone(),
                    spread: OnceLock::new(),
                }))
            })
            .collect::<Result<Vec<Arc<Case>>, Failure>>()?;
        Ok(Self {
            fineness: self.fineness,
            solver: self.solver.clone(),
            cases,
        })
    }

    /// Error of the surface that the draws are read from, where draws were made.
    pub(super) fn draw_error(&self, case: usize) -> Option<f64> {
        let case = self.cases.get(case)?;
        let own = || case.spread.get()?.as_ref().ok();
        let spread = case.inherited.as_ref().or_else(own)?;
        Some(spread.response.error)
    }

    /// The spread of the chain that this one comes from, where its medium is the same and its
    /// forces reach as far.
    fn inherited(&self, chain: &Chain, case: usize) -> Option<Arc<Spread>> {
        let parent = self.cases.get(case)?;
        if parent.medium != chain.joint().service.medium {
            return None;
        }
        let spread = match parent.spread.get() {
            Some(found) => found.as_ref().ok()?.clone(),
            None => parent.inherited.clone()?,
        };
        let range = chain.force_range(case, spread.gauge.force());
        spread.response.covers(range).then_some(spread)
    }

    pub(super) fn fineness(&self) -> Fineness {
        self.fineness
    }

    fn level(&self) -> Level {
        asked(self.fineness)
    }

    /// Contact and heat on one level under some conditions.
    fn solved(
        &self,
        chain: &Chain,
        task: (Level, Variant),
        under: (&Conditions, &Factors),
    ) -> Result<Arc<dyn Solved>, Failure> {
        self.solver.solved(chain.joint(), task, under)
    }

    /// The pressure field of a case at nominal; what becomes of flatness is that of the first case.
    pub(super) fn pressure(&self, chain: &Chain, case: usize) -> Result<PressureResult, Failure> {
        let nominal = &self.cases[case];
        let flatness = self.solver.flatness(
            chain.joint(),
            self.level(),
            &self.cases[0].conditions.forces,
        )?;
        Ok(nominal.solved.pressure(flatness, cone_beside(chain, case)?))
    }

    /// How the faces meet at a point.
    pub(super) fn met_at(&self, case: usize, point: [f64; 2]) -> Option<Meeting> {
        self.cases[case].solved.met_at(point)
    }

    /// Radius of a bolt's contact, m.
    pub(super) fn contact_radius(&self, case: usize, bolt: usize) -> f64 {
        self.cases[case].solved.contact_radius(bolt)
    }

    /// Where the contact of a case reaches an edge of plate or foot.
    pub(super) fn pressed_edge(&self, joint: &Joint, case: usize) -> Option<PressedEdge> {
        self.cases[case].solved.pressed_edge(joint)
    }

    /// Area of the faying faces, beside feet included, m².
    pub(super) fn footprint(&self) -> f64 {
        self.cases[0].solved.footprint()
    }

    /// The rings around a bolt at nominal.
    pub(super) fn rings(&self, case: usize, bolt: usize) -> Vec<RingRow> {
        self.cases[case].solved.rings(bolt)
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
            return Ok(nominal.solved.path().clone());
        }
        let spread = self.spread_of(chain, nominal)?;
        let from = spread.gauge.departure(&nominal.conditions);
        let to = spread.gauge.departure(conditions);
        let moved = spread.response.applied(nominal.solved.path(), (&from, &to));
        let form = between(spread.form, at.field) * between(spread.bent, at.flatness);
        Ok(with_form(moved, form))
    }

    /// Works out the spread of a case: it runs on all cores itself, so that draws that run side by
    /// side must find it done.
    pub(super) fn expect_draws(&self, chain: &Chain, case: usize) -> Result<(), Failure> {
        self.spread_of(chain, &self.cases[case]).map(|_| ())
    }

    fn spread_of<'c>(&self, chain: &Chain, case: &'c Case) -> Result<&'c Spread, Failure> {
        if let Some(spread) = &case.inherited {
            return Ok(spread);
        }
        let forces: f64 = case.conditions.forces.iter().sum();
        self.spread_over(chain, case, chain.force_range(case.index, forces))
    }

    /// The spread of a case, worked out over a range of force where it is not known yet.
    fn spread_over<'c>(
        &self,
        chain: &Chain,
        case: &'c Case,
        range: [f64; 2],
    ) -> Result<&'c Spread, Failure> {
        case.spread
            .get_or_init(|| self.spread(chain, case, range).map(Arc::new))
            .as_deref()
            .map_err(Clone::clone)
    }

    /// Everything the draws of a case need, on the ground level, over a range of force over the
    /// nominal.
    fn spread(&self, chain: &Chain, case: &Case, range: [f64; 2]) -> Result<Spread, Failure> {
        let base = self.solved(
            chain,
            (GROUND, Variant::Stated),
            (&case.conditions, &Factors::NONE),
        )?;
        let gauge = Gauge::of(&case.conditions, base.mean_pressure(), base.gap_mean());
        let open = self.departed(chain, &case.conditions, &response::open(range))?;
        let response = Response::through(
            range,
            |departures| {
                departures
                    .par_iter()
                    .map(|departure| self.departed(chain, &case.conditions, departure))
                    .collect::<Result<Vec<Path>, Failure>>()
            },
            open,
        )?;
        if case.index > 0 {
            // Ratios hardly know the temperature of the case; the first one's serve all.
            let first = self.spread_of(chain, &self.cases[0])?;
            return Ok(Spread {
                gauge,
                response,
                form: first.form,
                bent: first.bent,
            });
        }
        let ratio = |variant: &Variant| {
            let solved = self.solved(
                chain,
                (GROUND, *variant),
                (&case.conditions, &Factors::NONE),
            )?;
            Ok(solved.path().added_by_joint / base.path().added_by_joint)
        };
        let forms = self
            .solver
            .forms()
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
        let solved = self.solved(chain, (GROUND, Variant::Stated), (&conditions, &factors))?;
        Ok(solved.path().clone())
    }

    /// Difference of source to sink to the next coarser level, relative, and what that does not
    /// tell of the heat.
    pub(super) fn discretisation_error(&self, chain: &Chain) -> Result<f64, Failure> {
        let case = &self.cases[0];
        let coarse = self.solved(
            chain,
            (coarser(self.level()), Variant::Stated),
            (&case.conditions, &Factors::NONE),
        )?;
        let moved = coarse.path().source_to_sink / case.solved.path().source_to_sink - 1.0;
        Ok(moved.abs() + case.solved.heat_error())
    }

    /// Tabulates the field of bent faces from the least to the largest factor on the forces of a
    /// case, on the ground level as far as the draws reach; works out what the draws need there.
    pub(super) fn tabulate(
        &self,
        chain: &Chain,
        (case, [low, high]): (usize, [f64; 2]),
    ) -> Result<(), Failure> {
        let nominal = &self.cases[case];
        let forces = &nominal.conditions.forces;
        let joint = chain.joint();
        // Draws go beyond the nominal forces at both ends.
        let own = chain.force_range(case, forces.iter().sum());
        let drawn = [low.min(1.0) * own[0], high.max(1.0) * own[1]];
        if !joint.is_flat() {
            self.solver
                .tabulate(joint, self.level(), (forces, [low, high]))?;
        }
        self.spread_over(chain, nominal, drawn)?;
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
        let empty = self.solved(
            chain,
            (self.level(), Variant::Stated),
            (&empty, &Factors::NONE),
        )?;
        let share = 1.0 - case.solved.path().added_by_joint / empty.path().added_by_joint;
        Ok(if share.is_finite() {
            share.clamp(0.0, 1.0)
        } else {
            1.0
        })
    }
}

/// A factor between its ends: straight from the low one to 1 and on to the high one.
fn between([low, high]: [f64; 2], place: f64) -> f64 {
    if place < 0.0 {
        1.0 + place * (1.0 - low)
    } else {
        1.0 + place * (high - 1.0)
    }
}

/// The cone's answer at the same nominal inputs; none where it cannot carry the joint.
fn cone_beside(chain: &Chain, case: usize) -> Result<Option<ConeBeside>, Failure> {
    let joint = chain.joint();
    if !joint.needs_elastic().is_empty() {
        return Ok(None);
    }
    let cone = Chain::new(joint)?;
    let state = cone.state(case, &Realisation::default())?;
    Ok(Some(ConeBeside {
        radius_95: cone.pressure(case, &state)?.radius_95,
        contact: state.path.contact.recip(),
        source_to_sink: state.path.source_to_sink,
    }))
}
