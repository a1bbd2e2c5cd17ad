//! The joint on the bench: its model at any value of the unknown, at any load.

use crate::{
    estimate::{Chain, Choice, Realisation, State, Watch},
    fit::{
        likelihood::Nuisance,
        profile::Range,
        unknown::{Failure, Load, Question, Unknown, question, words},
    },
    joint::{Joint, Plane, Tightening},
    numerics::{roots, sampling::Sobol},
    uncertainty::{Input, NUMERICAL, inputs},
};

/// Reads the joint with overrides; what was refused comes as its faults, drawn.
pub type Reader<'a> = dyn Fn(&[String]) -> Result<Joint, String> + 'a;

/// A joint whose model is to be fitted.
pub struct Bench<'a> {
    /// Reads it with overrides.
    pub reader: &'a Reader<'a>,
    /// The field of its model.
    pub choice: Choice,
    /// Whom to tell how far it has come.
    pub watch: Watch,
    /// The case of its service, counted from 0.
    pub case: usize,
}

/// What the inputs other than the unknown do at one value of it.
pub(super) struct Other {
    pub nuisance: Nuisance,
    pub inputs: Vec<&'static str>,
    pub contact_share: f64,
    pub numerical_error: f64,
    pub title: String,
    pub field: &'static str,
    pub planes: String,
}

/// Quantiles between which an input without bounds is sought.
const TAILS: [f64; 2] = [1e-3, 1.0 - 1e-3];

/// Where an input lies at its ends, as it reads.
pub(super) fn extent(input: &Input) -> [f64; 2] {
    let read = |quantile: f64| {
        let mut at = Realisation::default();
        (input.place)(&mut at, quantile);
        (input.reading)(&at)
    };
    let whole = [0.0, 1.0].map(read);
    if whole.iter().all(|end| end.is_finite()) {
        whole
    } else {
        TAILS.map(read)
    }
}

/// Puts an input where it reads a value.
fn put(input: &Input, at: &mut Realisation, value: f64) {
    let below = |quantile: f64| {
        (input.place)(at, quantile);
        (input.reading)(at) < value
    };
    let quantile = roots::halved(below, 0.0, 1.0);
    (input.place)(at, quantile);
}

impl Bench<'_> {
    /// The unknown of this joint that is asked for, with its range.
    pub fn unknown(
        &self,
        asked: &str,
        ends: [Option<&str>; 2],
    ) -> Result<(Unknown, Range), Failure> {
        let joint = (self.reader)(&[]).map_err(Failure::Refused)?;
        let (unknown, [from, to]) = words::named(&joint, asked, ends)?;
        if from >= to {
            return Err(question(
                format!("the range of `{asked}` does not rise"),
                "let --from be less than --to",
            ));
        }
        Ok((unknown, Range::new(from, to)))
    }

    /// ln conductance load by load at every value of the unknown, other inputs nominal.
    pub fn models(
        &self,
        asked: &Question,
        loads: &[Load],
        values: &[f64],
    ) -> Result<Vec<Vec<f64>>, Failure> {
        let mut found = Vec::with_capacity(values.len());
        match &asked.unknown {
            Unknown::Fields { .. } => {
                for (at, value) in values.iter().enumerate() {
                    self.tell(asked, (at, values.len(), *value));
                    let mut model = Vec::with_capacity(loads.len());
                    self.each(&asked.unknown.sets(*value), loads, |chain| {
                        let state = chain.state(self.case, &Realisation::default())?;
                        model.push(conductance(&state, asked.plane)?);
                        Ok(())
                    })?;
                    found.push(model);
                }
            }
            // One solution serves every place of an input.
            Unknown::Input { name } => {
                found.resize(values.len(), Vec::with_capacity(loads.len()));
                self.each(&[], loads, |chain| {
                    let known = inputs(chain);
                    let input = known.iter().find(|input| input.name == *name);
                    for (model, value) in found.iter_mut().zip(values) {
                        let mut at = Realisation::default();
                        if let Some(input) = input {
                            put(input, &mut at, *value);
                        }
                        model.push(conductance(&chain.state(self.case, &at)?, asked.plane)?);
                    }
                    Ok(())
                })?;
            }
        }
        self.watch.tell("");
        Ok(found)
    }

    /// What the other inputs do at a value of the unknown, and what the report says of it.
    pub(super) fn nuisance(
        &self,
        asked: &Question,
        loads: &[Load],
        value: f64,
    ) -> Result<Other, Failure> {
        let draws = asked.draws as usize;
        let mut drawn = vec![Vec::with_capacity(loads.len()); draws];
        let mut nominal = Vec::with_capacity(loads.len());
        let mut told: Option<Other> = None;
        self.watch.tell("what the other inputs leave open");
        self.each(&asked.unknown.sets(value), loads, |chain| {
            let all = inputs(chain);
            let mut middle = Realisation::default();
            if let Unknown::Input { name } = &asked.unknown
                && let Some(input) = all.iter().find(|input| input.name == *name)
            {
                put(input, &mut middle, value);
            }
            let others: Vec<&Input> = all
                .iter()
                // The error of the grid is added once, to what the draws leave open.
                .filter(|input| input.name != NUMERICAL && !asked.unknown.replaces(input.name))
                .collect();
            let state = chain.state(self.case, &middle)?;
            nominal.push(conductance(&state, asked.plane)?);
            if draws > 0 {
                chain.expect_draws(self.case)?;
            }
            let sobol = Sobol::new(others.len(), asked.seed);
            let mut point = vec![0.0; others.len()];
            for (index, joint) in drawn.iter_mut().enumerate() {
                sobol.point(index as u32, &mut point);
                let mut at = middle.clone();
                for (input, quantile) in others.iter().zip(&point) {
                    (input.place)(&mut at, *quantile);
                }
                joint.push(conductance(&chain.state(self.case, &at)?, asked.plane)?);
            }
            if told.is_none() {
                let own = conductance(&state, asked.plane)?.exp();
                told = Some(Other {
                    nuisance: Nuisance::none(loads.len()),
                    inputs: if draws > 0 {
                        others.iter().map(|input| input.name).collect()
                    } else {
                        Vec::new()
                    },
                    contact_share: own / state.path.contact,
                    numerical_error: chain.discretisation_error(&state)?,
                    title: chain.joint().title.clone(),
                    field: chain.field_name(),
                    planes: planes(chain, (asked.plane, self.case)),
                });
            }
            Ok(())
        })?;
        self.watch.tell("");
        let mut told = told.ok_or(Failure::Likelihood("there is no reading"))?;
        let nuisance = if draws > 0 {
            Nuisance::of(&drawn, &nominal)
        } else {
            Nuisance::none(loads.len())
        };
        told.nuisance = nuisance.with_error(told.numerical_error);
        Ok(told)
    }

    /// The chain of the joint at every load.
    fn each(
        &self,
        sets: &[String],
        loads: &[Load],
        mut work: impl FnMut(&Chain) -> Result<(), Failure>,
    ) -> Result<(), Failure> {
        let read = |more: &[String]| {
            let all: Vec<String> = sets.iter().chain(more).cloned().collect();
            (self.reader)(&all).map_err(Failure::Refused)
        };
        let joint = read(&[])?;
        let cases = joint.service.cases.len();
        if self.case >= cases {
            return Err(question(
                format!("the joint has {cases} thermal cases"),
                format!("count them from 1: --case 1 to {cases}"),
            ));
        }
        let by_force = loads.iter().any(|load| matches!(load, Load::Force(_)));
        let stated = if by_force {
            None
        } else {
            Some(Chain::of(&joint, self.choice, &self.watch)?)
        };
        for load in loads {
            match (load, &stated) {
                (Load::Force(force), _) => {
                    let count = joint.fasteners.len();
                    let more: Vec<String> = (1..=count)
                        .map(|group| match count {
                            1 => format!("fastener.preload={force} N"),
                            _ => format!("fastener[{group}].preload={force} N"),
                        })
                        .collect();
                    let joint = read(&more)?;
                    work(&Chain::of(&joint, self.choice, &self.watch)?)?;
                }
                (Load::Torque(torque), Some(chain)) => {
                    let torqued = |at: &usize| {
                        matches!(joint.fasteners[*at].tightening, Tightening::Torque(_))
                    };
                    let groups: Vec<usize> = (0..joint.fasteners.len()).filter(torqued).collect();
                    let Some((first, rest)) = groups.split_first() else {
                        return Err(question(
                            "the joint states the preload of its bolts, and was measured at torques",
                            "state `torque` and `friction` in place of `preload`, or give forces",
                        ));
                    };
                    let mut changed = chain.with_torque(*first, *torque)?;
                    for group in rest {
                        changed = changed.with_torque(*group, *torque)?;
                    }
                    work(&changed)?;
                }
                (Load::Stated, Some(chain)) => work(chain)?,
                (_, None) => return Err(Failure::Likelihood("forces and torques are mixed")),
            }
        }
        Ok(())
    }

    fn tell(&self, asked: &Question, (at, count, value): (usize, usize, f64)) {
        let shown = asked.unknown.shown(value);
        self.watch
            .tell(&format!("value {} of {count}: {shown}", at + 1));
    }
}

/// ln of the conductance between planes.
fn conductance(state: &State, plane: Plane) -> Result<f64, Failure> {
    let path = &state.path;
    let found = match plane {
        Plane::Contact => path.contact,
        Plane::NodeToNode => path.node_to_node.recip(),
        Plane::AddedByJoint => path.added_by_joint.recip(),
        Plane::SourceToSink => path.source_to_sink.recip(),
    };
    if found > 0.0 && found.is_finite() {
        Ok(found.ln())
    } else {
        Err(Failure::Likelihood(
            "the model conducts nothing between these planes",
        ))
    }
}

/// Between which planes the conductance stands.
fn planes(chain: &Chain, (plane, case): (Plane, usize)) -> String {
    let joint = chain.joint();
    let case = joint.service.cases[case].name;
    let ends = match plane {
        Plane::Contact => "contact only, both faces at one temperature".to_owned(),
        Plane::NodeToNode => "node to node, means of the first and the last plate".to_owned(),
        Plane::AddedByJoint => "added by the joint".to_owned(),
        Plane::SourceToSink => {
            let nominal = crate::estimate::plane_names(joint);
            format!("source to sink: {} to {}", nominal.0, nominal.1)
        }
    };
    format!("{ends}; {case} case")
}
