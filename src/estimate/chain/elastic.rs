//! The chain on a solved field: elastic contact and heat of the whole plates.

mod columns;
mod flat;
mod level;
mod pattern;
mod plan;
mod remade;
mod response;
mod rings;
mod round;
mod solver;
mod spread;
mod variant;

use std::sync::{Arc, OnceLock};

use crate::{
    estimate::{
        Chain, ConeBeside, Failure, Fineness, InterfaceResult, Meeting, PressureResult,
        Realisation, RingRow, Watch,
        chain::{PressedEdge, Warmth, conditions::Conditions},
    },
    joint::{Joint, Medium},
    resistance::Path,
};

use columns::Columns;
use level::{Level, asked, coarser};
pub(super) use plan::ElasticPlan;
pub(super) use response::{LEAST_FORCE, Readings, moved, readings};
use round::Round;
pub(super) use solver::Solved;
use solver::{Factors, Solver};
use spread::Spread;
use variant::Variant;

/// Plates whose temperature is that near to where their properties were taken are left there, relative:
/// conductivities go with at most the third power of it, in cryogenic copper, and so move by 0.6 %.
const WARM_ENOUGH: f64 = 0.002;
/// Times that properties are taken anew at the temperatures they lead to.
const MOST_WARMINGS: usize = 8;

/// The solved field of a joint, brought to the forces and the medium of a chain.
#[derive(Clone, Debug)]
pub(super) struct ElasticModel {
    fineness: Fineness,
    /// Shared with the chains of other torques and media.
    solver: Arc<dyn Solver>,
    /// Every case, solved when it is first asked for.
    cases: Vec<Arc<OnceLock<Result<Case, Failure>>>>,
    medium: Medium,
    /// What the chain this one comes from has worked out for its draws, case by case.
    parent: Vec<Option<(Medium, Arc<Spread>)>>,
    /// Temperatures of the plates in the chain this one comes from, case by case: where they hold
    /// here too, one solution is enough, and its perfect contact is known.
    warmths: Vec<Option<Warmth>>,
}

/// What one case is at nominal, and what the draws need.
#[derive(Debug)]
struct Case {
    warmth: Warmth,
    conditions: Conditions,
    /// None where no bolt clamps any more.
    solved: Option<Arc<dyn Solved>>,
    spread: OnceLock<Result<Arc<Spread>, Failure>>,
}

impl Case {
    /// Mean temperatures of the plates under the stated heat; none where they are those at which the
    /// properties were taken.
    fn warmed(&self, chain: &Chain, case: usize) -> Option<Warmth> {
        let service = &chain.joint().service;
        let heat = service.heat?;
        let means = self.solved.as_ref()?.temperatures().plate_means;
        let sink = service.cases[case].temperature;
        let warmth = Warmth::above(sink, means.iter().map(|mean| heat * mean));
        (warmth.apart(&self.warmth) > WARM_ENOUGH).then_some(warmth)
    }
}

impl ElasticModel {
    pub(super) fn new(
        joint: &Joint,
        (fineness, memory): (Fineness, u64),
        watch: &Watch,
    ) -> Result<Self, Failure> {
        let solver: Arc<dyn Solver> = match Round::of(joint, memory, watch) {
            Some(round) => Arc::new(round),
            None => Arc::new(Columns::new(joint, memory, watch)?),
        };
        Ok(Self {
            fineness,
            solver,
            cases: Vec::new(),
            medium: joint.service.medium.clone(),
            parent: Vec::new(),
            warmths: Vec::new(),
        })
    }

    /// The same plates for the forces and the medium of a chain; nothing is solved yet.
    pub(super) fn levelled(&self, chain: &Chain) -> Self {
        let count = chain.joint().service.cases.len();
        Self {
            fineness: self.fineness,
            solver: self.solver.clone(),
            cases: (0..count).map(|_| Arc::new(OnceLock::new())).collect(),
            medium: chain.joint().service.medium.clone(),
            parent: (0..count).map(|case| self.known_spread(case)).collect(),
            warmths: (0..count).map(|case| self.known_warmth(case)).collect(),
        }
    }

    /// The same plates, with nothing taken over that draws of other bolts worked out.
    pub(super) fn afresh(&self) -> Self {
        Self {
            fineness: self.fineness,
            solver: self.solver.clone(),
            cases: Vec::new(),
            medium: self.medium.clone(),
            parent: Vec::new(),
            warmths: Vec::new(),
        }
    }

    /// The plates of a joint that differs in thickness, bow, film or gas; what is known of the contact goes
    /// along where it is the same.
    pub(super) fn remade(&self, joint: &Joint, same_contact: bool) -> Result<Self, Failure> {
        Ok(Self {
            solver: self.solver.remade(joint, same_contact)?,
            ..self.afresh()
        })
    }

    /// The same joint at another fineness, with what is known of its contact, its plates and their
    /// temperatures.
    pub(super) fn at_fineness(&self, joint: &Joint, fineness: Fineness) -> Result<Self, Failure> {
        let count = joint.service.cases.len();
        Ok(Self {
            fineness,
            solver: self.solver.lent(joint)?,
            warmths: (0..count).map(|case| self.known_warmth(case)).collect(),
            ..self.afresh()
        })
    }

    /// Solves the contact of a case as far as another fineness needs it, heat left out, so that chains of
    /// both find it.
    pub(super) fn expect_contact(&self, chain: &Chain, fineness: Fineness) -> Result<(), Failure> {
        let start = self.known_warmth(0).unwrap_or_else(|| chain.cold(0));
        let conditions = chain.conditions_at(0, &start, &Realisation::default())?;
        if conditions.forces.iter().sum::<f64>() <= 0.0 {
            return Ok(());
        }
        chain.refuse_open(0, &conditions.forces)?;
        // What becomes of flatness asks for every field that a nominal state does.
        self.solver
            .flatness(chain.joint(), asked(fineness), &conditions)
            .map(|_| ())
    }

    /// Lets go of all fields but the nominal ones of the cases.
    pub(super) fn forget_fields(&self) {
        self.solver.forget();
    }

    /// Temperatures of the plates in a case, as far as they are known without a solution.
    fn known_warmth(&self, case: usize) -> Option<Warmth> {
        let own = || {
            let case = self.cases.get(case)?.get()?.as_ref().ok()?;
            Some(case.warmth.clone())
        };
        own().or_else(|| self.warmths.get(case)?.clone())
    }

    /// The spread of a case with its medium, where one is known.
    fn known_spread(&self, case: usize) -> Option<(Medium, Arc<Spread>)> {
        let own = || {
            let case = self.cases.get(case)?.get()?.as_ref().ok()?;
            let spread = case.spread.get()?.as_ref().ok()?;
            Some((self.medium.clone(), spread.clone()))
        };
        let given = || self.parent.get(case)?.clone();
        // A chain that takes its parent's spread works out none of its own.
        own().or_else(given)
    }

    /// A case, solved at nominal.
    fn case(&self, chain: &Chain, index: usize) -> Result<&Case, Failure> {
        self.cases[index]
            .get_or_init(|| {
                let start = self.warmths.get(index).cloned().flatten();
                let start = start.unwrap_or_else(|| chain.cold(index));
                let mut case = self.case_at(chain, (index, start))?;
                for _ in 0..MOST_WARMINGS {
                    let Some(warmth) = case.warmed(chain, index) else {
                        break;
                    };
                    case = self.case_at(chain, (index, warmth))?;
                }
                Ok(case)
            })
            .as_ref()
            .map_err(Clone::clone)
    }

    /// A case with properties at some temperatures.
    fn case_at(&self, chain: &Chain, (index, warmth): (usize, Warmth)) -> Result<Case, Failure> {
        let conditions = chain.conditions_at(index, &warmth, &Realisation::default())?;
        let solved = if conditions.forces.iter().sum::<f64>() > 0.0 {
            chain.refuse_open(index, &conditions.forces)?;
            let stated = (self.level(), Variant::Stated);
            Some(self.solved(chain, stated, (&conditions, &Factors::NONE))?)
        } else {
            None
        };
        Ok(Case {
            warmth,
            conditions,
            solved,
            spread: OnceLock::new(),
        })
    }

    /// Temperatures at which the properties of a case are taken.
    pub(super) fn warmth(&self, chain: &Chain, case: usize) -> Result<&Warmth, Failure> {
        Ok(&self.case(chain, case)?.warmth)
    }

    /// A case in which bolts clamp, with its contact and heat.
    fn closed(&self, chain: &Chain, index: usize) -> Result<(&Case, &dyn Solved), Failure> {
        let case = self.case(chain, index)?;
        match &case.solved {
            Some(solved) => Ok((case, solved.as_ref())),
            None => Err(chain.open(index, &case.conditions.forces)),
        }
    }

    /// Error of the surfaces that the draws are read from, where draws were made.
    pub(super) fn draw_error(&self, case: usize) -> Option<f64> {
        let case = self.cases.get(case)?.get()?.as_ref().ok()?;
        let spread = case.spread.get()?.as_ref().ok()?;
        Some(spread.response.error)
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
        let (_, solved) = self.closed(chain, case)?;
        let first = &self.case(chain, 0)?.conditions;
        let flatness = self.solver.flatness(chain.joint(), self.level(), first)?;
        Ok(solved.pressure(flatness, cone_beside(chain, case)?))
    }

    /// Every interface of a case at nominal.
    pub(super) fn interfaces(
        &self,
        chain: &Chain,
        case: usize,
    ) -> Result<Vec<InterfaceResult>, Failure> {
        let (_, solved) = self.closed(chain, case)?;
        Ok(solved.interfaces(chain.joint()))
    }

    /// Where the contact of a case reaches an edge of plate or foot.
    pub(super) fn pressed_edge(&self, chain: &Chain, case: usize) -> Option<PressedEdge> {
        let (_, solved) = self.closed(chain, case).ok()?;
        solved.pressed_edge(chain.joint())
    }

    /// Contact and heat of a case at nominal.
    pub(super) fn of_case(&self, chain: &Chain, case: usize) -> Result<&dyn Solved, Failure> {
        self.closed(chain, case).map(|(_, solved)| solved)
    }

    /// How the faces of an interface meet at a point in the first case.
    pub(super) fn met_at(&self, chain: &Chain, at: ([f64; 2], usize)) -> Option<Meeting> {
        self.closed(chain, 0).ok()?.1.met_at(at)
    }

    /// Radius of a bolt's contact, m; not a number where no bolt clamps.
    pub(super) fn contact_radius(&self, chain: &Chain, (case, bolt): (usize, usize)) -> f64 {
        self.closed(chain, case)
            .map_or(f64::NAN, |(_, solved)| solved.contact_radius(bolt))
    }

    /// Area of the faying faces, beside feet included, m²; not a number where no bolt clamps.
    pub(super) fn footprint(&self, chain: &Chain) -> f64 {
        self.closed(chain, 0)
            .map_or(f64::NAN, |(_, solved)| solved.footprint())
    }

    /// The rings around every bolt in an interface, in the first case at nominal.
    pub(super) fn rings(&self, chain: &Chain, interface: usize) -> Vec<Vec<RingRow>> {
        self.closed(chain, 0)
            .map_or_else(|_| Vec::new(), |(_, solved)| solved.rings(interface))
    }

    /// The path of a case at one realisation.
    pub(super) fn path(
        &self,
        chain: &Chain,
        index: usize,
        (conditions, at): (&Conditions, &Realisation),
    ) -> Result<Path, Failure> {
        let case = self.case(chain, index)?;
        let nominal = *at == Realisation::default();
        if let (true, Some(solved)) = (nominal, &case.solved) {
            return Ok(solved.path().clone());
        }
        let spread = self.spread_of(chain, index)?;
        let from = spread.gauge.departure(&case.conditions);
        let to = spread.gauge.departure(conditions);
        let Some(solved) = &case.solved else {
            // Without force in the nominal state there is nothing to move from: the draws and the
            // nominal stand on the ground level.
            let shift = spread.shift((&conditions.forces, to[0]), &at.stated);
            let base = &spread.response.base;
            return Ok(spread
                .response
                .shifted(base, (&response::NOMINAL, &to), &shift));
        };
        let (there, here) = (
            spread.shift((&conditions.forces, to[0]), &at.stated),
            spread.shift((&case.conditions.forces, from[0]), &[]),
        );
        let shift = std::array::from_fn(|reading| there[reading] - here[reading]);
        let places = [
            at.field,
            at.flatness * chain.joint().flatness_factor(&at.stated),
        ];
        Ok(spread.moved(solved.path(), (&from, &to), (&shift, places)))
    }

    /// Works out the spread of a case: it runs on all cores itself, so that draws that run side by
    /// side must find it done.
    pub(super) fn expect_draws(&self, chain: &Chain, case: usize) -> Result<(), Failure> {
        self.spread_of(chain, case).map(|_| ())
    }

    fn spread_of(&self, chain: &Chain, index: usize) -> Result<&Spread, Failure> {
        let case = self.case(chain, index)?;
        let forces: f64 = case.conditions.forces.iter().sum();
        let mut range = chain.force_range(index, forces);
        if index == 0 {
            // The other cases may read their draws here.
            for other in 1..self.cases.len() {
                let [low, high] = chain.force_range(other, forces);
                range = [range[0].min(low), range[1].max(high)];
            }
        }
        self.spread_over(chain, index, range)
    }

    /// The spread of the first case, where it has one.
    fn spread_of_first(&self, chain: &Chain) -> Option<&Arc<Spread>> {
        self.spread_of(chain, 0).ok()?;
        let first = self.case(chain, 0).ok()?.spread.get()?;
        first.as_ref().ok()
    }

    /// The spread of a case over a range of force: its own, or that of the chain this one comes
    /// from where the medium is the same and the forces reach as far.
    fn spread_over(
        &self,
        chain: &Chain,
        index: usize,
        range: [f64; 2],
    ) -> Result<&Spread, Failure> {
        let case = self.case(chain, index)?;
        case.spread
            .get_or_init(|| {
                let given = self.parent.get(index).and_then(Option::as_ref);
                if let Some((medium, spread)) = given
                    && *medium == self.medium
                    && spread
                        .response
                        .covers(chain.force_range(index, spread.gauge.force()))
                {
                    return Ok(spread.clone());
                }
                if case.solved.is_none() {
                    return Err(chain.open(index, &case.conditions.forces));
                }
                let first = match index {
                    0 => None,
                    _ => self.spread_of_first(chain),
                };
                if let Some(first) = first
                    && first
                        .response
                        .holds(&first.gauge.departure(&case.conditions), &first.gauge)
                    && first
                        .response
                        .covers(chain.force_range(index, first.gauge.force()))
                {
                    return Ok(first.clone());
                }
                let first = first.map(Arc::as_ref);
                self.spread(chain, (index, &case.conditions), (range, first))
                    .map(Arc::new)
            })
            .as_deref()
            .map_err(Clone::clone)
    }

    /// Larger of the last two differences of source to sink between levels, relative, and what
    /// that does not tell of the heat.
    ///
    /// Two levels may agree by chance: lines fall otherwise on holes and contact edges. On the
    /// reference joints the last two steps together held the error at every level.
    pub(super) fn discretisation_error(&self, chain: &Chain) -> Result<f64, Failure> {
        let (case, solved) = self.closed(chain, 0)?;
        let whole = solved.path().source_to_sink;
        let at = |level: Level| -> Result<f64, Failure> {
            let task = (level, Variant::Stated);
            let solved = self.solved(chain, task, (&case.conditions, &Factors::NONE))?;
            Ok(solved.path().source_to_sink)
        };
        let below = coarser(self.level());
        let next = at(below)?;
        let last = at(coarser(below))?;
        let moved = (next - whole).abs().max((last - next).abs()) / whole;
        Ok(moved + solved.heat_error())
    }

    /// Tabulates the field of bent faces from the least to the largest factor on the forces of a
    /// case; works out what the draws need over all of them.
    pub(super) fn tabulate(
        &self,
        chain: &Chain,
        (index, [low, high]): (usize, [f64; 2]),
    ) -> Result<(), Failure> {
        let (case, _) = self.closed(chain, index)?;
        let forces = &case.conditions.forces;
        let joint = chain.joint();
        // With several groups one torque changes the pattern, which no table follows.
        let meets = joint.is_flat() && joint.is_flush();
        if !meets && joint.fasteners.len() == 1 {
            let low = low.max(response::LEAST_FORCE);
            self.solver
                .tabulate(joint, self.level(), (forces, [low, high]))?;
        }
        // Draws go beyond the nominal forces at both ends.
        let own = chain.force_range(index, forces.iter().sum());
        let drawn = [low.min(1.0) * own[0], high.max(1.0) * own[1]];
        // A sweep looks at one case: bounds of its own cost less than all that the first one would
        // have to work out before it could lend them.
        case.spread
            .get_or_init(|| {
                self.spread(chain, (index, &case.conditions), (drawn, None))
                    .map(Arc::new)
            })
            .as_ref()
            .map(|_| ())
            .map_err(Clone::clone)
    }

    /// Share of what the gas takes off the joint's resistance.
    pub(super) fn gas_share(&self, chain: &Chain) -> Result<f64, Failure> {
        let (case, solved) = self.closed(chain, 0)?;
        let Some(empty) = case.conditions.without_gas() else {
            return Ok(0.0);
        };
        let empty = self.solved(
            chain,
            (self.level(), Variant::Stated),
            (&empty, &Factors::NONE),
        )?;
        let share = 1.0 - solved.path().added_by_joint / empty.path().added_by_joint;
        Ok(if share.is_finite() {
            share.clamp(0.0, 1.0)
        } else {
            1.0
        })
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
