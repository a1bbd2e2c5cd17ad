//! The joint of other thickness, bow, film or gas pressure on the ground level, for the draws.

use crate::{
    estimate::{
        Chain, Failure, Realisation,
        chain::{
            Model,
            conditions::Conditions,
            elastic::{
                ElasticModel,
                level::GROUND,
                response::{Departure, NOMINAL, Response},
                solver::{Depth, Factors, State},
                spread::{departed, under},
                variant::Variant,
            },
            remade::{Remade, Remaker, Stated},
        },
    },
    resistance::Path,
};

/// Part of the half widths of the design by which the probes depart in contact, gap and conductivities.
const PROBED: [f64; 5] = [0.6, -0.5, -0.5, 0.6, 0.5];

/// A case whose joint is solved under other values.
struct Beside<'a> {
    model: &'a ElasticModel,
    chain: &'a Chain<'a>,
    case: usize,
    nominal: &'a Conditions,
    response: &'a Response,
}

impl ElasticModel {
    /// What the stated values of a case do that make another joint, over a range of force over the
    /// nominal; none where there are none.
    pub(super) fn remade_answers(
        &self,
        chain: &Chain,
        (case, nominal): (usize, &Conditions),
        (range, response): ([f64; 2], &Response),
    ) -> Result<Option<Remade>, Failure> {
        let beside = Beside {
            model: self,
            chain,
            case,
            nominal,
            response,
        };
        Remade::through(chain.joint(), range, &beside)
    }

    /// The path on the ground level under the conditions of a draw, with the stated values of the draw
    /// that make another joint; its forces are those of the draw.
    pub(super) fn drawn_for_itself(
        &self,
        chain: &Chain,
        (case, conditions): (usize, &Conditions),
        at: &Realisation,
    ) -> Result<Path, Failure> {
        let joint = chain.joint();
        let place = |index: usize| at.stated.get(index).copied().unwrap_or(0.0);
        let values: Vec<Stated> = joint
            .remaking()
            .into_iter()
            .map(|index| (index, joint.uncertain[index].bounds.at(place(index))))
            .collect();
        let state = State {
            variant: Variant::Stated,
            conditions: conditions.clone(),
            factors: Factors::NONE,
            depth: Depth::Solved,
        };
        if values.is_empty() {
            return Ok(one(self.solver.paths(joint, GROUND, &[state])?));
        }
        let other = chain.remade(&values)?;
        let conditions = other.conditions_at(case, self.warmth(chain, case)?, at)?;
        let state = State {
            conditions,
            ..state
        };
        Ok(one(other.ground_paths(&[state])?))
    }
}

impl Chain<'_> {
    /// Paths of states of this joint on the ground level.
    fn ground_paths(&self, states: &[State]) -> Result<Vec<Path>, Failure> {
        match &self.model {
            Model::Elastic(model) => model.solver.paths(self.joint(), GROUND, states),
            Model::Cone(_) => unreachable!("a solved field is remade as a solved field"),
        }
    }
}

impl Beside<'_> {
    /// The states made of the nominal conditions of the joint of some values, solved there.
    fn solved(
        &self,
        values: &[Stated],
        states: impl Fn(&Conditions) -> Vec<State>,
    ) -> Result<Vec<Path>, Failure> {
        if values.is_empty() {
            let joint = self.chain.joint();
            return self
                .model
                .solver
                .paths(joint, GROUND, &states(self.nominal));
        }
        let other = self.chain.remade(values)?;
        let warmth = self.model.warmth(self.chain, self.case)?;
        let nominal = other.conditions_at(self.case, warmth, &Realisation::default())?;
        other.ground_paths(&states(&nominal))
    }
}

impl Remaker<Failure> for Beside<'_> {
    fn paths(&self, values: &[Stated], forces: &[f64]) -> Result<Vec<Path>, Failure> {
        // From the nominal force outwards, so that each contact starts from the nearest.
        let mut order: Vec<usize> = (0..forces.len()).collect();
        order.sort_by(|one, other| forces[*one].abs().total_cmp(&forces[*other].abs()));
        let solved = self.solved(values, |nominal| {
            let forces = order.iter().map(|place| forces[*place]);
            let state = |force: f64| State {
                variant: Variant::Stated,
                conditions: under(nominal, force),
                factors: Factors::NONE,
                depth: Depth::Solved,
            };
            forces.map(state).collect()
        })?;
        let mut numbered: Vec<(usize, Path)> = order.into_iter().zip(solved).collect();
        numbered.sort_by_key(|(place, _)| *place);
        Ok(numbered.into_iter().map(|(_, path)| path).collect())
    }

    fn probed(&self, values: &[Stated], (force, side): (f64, f64)) -> Result<[Path; 2], Failure> {
        let mut departure: Departure = NOMINAL;
        let [along, rest @ ..] = &mut departure;
        *along = force;
        for ((off, part), step) in rest.iter_mut().zip(PROBED).zip(self.response.steps) {
            *off = side * part * step;
        }
        let told = self.response.alone(&departure);
        let solved = self.solved(values, |nominal| {
            vec![departed(nominal, &(departure, Depth::Solved))]
        })?;
        Ok([told, one(solved)])
    }
}

/// The only path of some.
fn one(paths: Vec<Path>) -> Path {
    match paths.into_iter().next() {
        Some(path) => path,
        None => unreachable!("one state has one path"),
    }
}
