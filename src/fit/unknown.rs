//! One unknown of a joint's model, fitted to the conductance measured between its planes.

mod bench;
mod cautions;
mod words;

pub(crate) use cautions::moved;

pub use bench::{Bench, Reader};
pub use words::{Template, Unknown, WORDS};

use crate::{
    diagnostic::Caution,
    estimate,
    fit::{
        likelihood::{Likelihood, Nuisance, Target},
        profile::{Curve, Profile, Range},
        readings::{Abscissa, Readings},
    },
    joint::Plane,
};

/// Values of the unknown at which the model is solved at first.
const NODES: usize = 21;

/// Rounds of solving the model at the top and the ends of what was found.
const ROUNDS: usize = 4;

/// Share of the standard deviation of the readings that interpolation may miss.
const FINE_ENOUGH: f64 = 0.05;

/// Most readings held against a model.
const MOST_READINGS: usize = 1000;

/// What is asked.
#[derive(Clone, Debug, PartialEq)]
pub struct Question {
    /// The unknown.
    pub unknown: Unknown,
    /// Between which values it is sought.
    pub range: Range,
    /// Between which planes was measured.
    pub plane: Plane,
    /// Joints drawn for what the other inputs leave open; 0 leaves them out.
    pub draws: u32,
    /// Seed of the draws.
    pub seed: u64,
}

/// What was found.
#[derive(Clone, Debug, PartialEq)]
pub struct Answer {
    /// Title of the joint.
    pub title: String,
    /// The field of the model.
    pub field: &'static str,
    /// Planes of the conductance.
    pub planes: String,
    /// The profile.
    pub profile: Profile,
    /// The values of the unknown at which the model was solved.
    pub nodes: Vec<f64>,
    /// Largest miss of the interpolation where it was held against the model, in ln.
    pub interpolation: f64,
    /// Standard deviation of the readings' common part alone, in ln.
    pub measured: f64,
    /// That of the model by its other inputs, in ln.
    pub other: f64,
    /// Both together.
    pub whole: f64,
    /// Scatter of single readings in ln, where it was found from them.
    pub scatter: Option<f64>,
    /// Names of the inputs integrated out.
    pub inputs: Vec<&'static str>,
    /// Contact only as a share of the measured resistance, at the best value.
    pub contact_share: f64,
    /// Numerical error of the model at the best value, a share.
    pub numerical_error: f64,
    /// Number of readings.
    pub readings: usize,
    /// Rise of −2 ln L that bounds the interval.
    pub threshold: f64,
    /// What to know of the fit.
    pub cautions: Vec<Caution>,
}

/// Why an unknown could not be fitted.
#[derive(Debug, thiserror::Error)]
pub enum Failure {
    /// The joint file was refused; its faults, already drawn.
    #[error("{0}")]
    Refused(String),
    /// The model gave no number.
    #[error(transparent)]
    Chain(#[from] estimate::Failure),
    /// The question makes no sense for this joint or these readings.
    #[error("{message}")]
    Question {
        /// What is wrong.
        message: String,
        /// The way out.
        help: String,
    },
    /// The conductances have no likelihood.
    #[error("the readings have no likelihood: {0}")]
    Likelihood(&'static str),
}

/// A question that cannot be put.
fn question(message: impl Into<String>, help: impl Into<String>) -> Failure {
    Failure::Question {
        message: message.into(),
        help: help.into(),
    }
}

/// Fits the unknown of a joint on a bench to readings of its conductance.
pub fn fit(bench: &Bench, asked: &Question, readings: &Readings) -> Result<Answer, Failure> {
    let (target, loads) = target(readings)?;
    let mut curve = Curve::default();
    let shares: Vec<f64> = (0..NODES)
        .map(|at| at as f64 / (NODES - 1) as f64)
        .collect();
    let values: Vec<f64> = shares.iter().map(|share| asked.range.at(*share)).collect();
    for (share, model) in shares.iter().zip(bench.models(asked, &loads, &values)?) {
        curve.insert(*share, model);
    }
    // What the other inputs do is worked out in the middle, and again where the likelihood ends up.
    let mut other = bench.nuisance(asked, &loads, asked.range.at(0.5))?;
    let (mut likelihood, _) = likelihood(&target, &curve, &other.nuisance)?;
    let mut profile = Profile::of(&curve, &likelihood, &target);
    other = bench.nuisance(asked, &loads, asked.range.at(profile.best))?;
    let mut scatter;
    (likelihood, scatter) = self::likelihood(&target, &curve, &other.nuisance)?;
    profile = Profile::of(&curve, &likelihood, &target);
    let mut interpolation = 0.0;
    for _ in 0..ROUNDS {
        let [low, high] = profile.interval;
        let mut open: Vec<f64> = Vec::new();
        for share in [
            profile.best,
            low,
            high,
            f64::midpoint(low, profile.best),
            f64::midpoint(profile.best, high),
        ] {
            if !curve.has(share) && !open.iter().any(|other| (other - share).abs() < 1e-3) {
                open.push(share);
            }
        }
        if open.is_empty() {
            break;
        }
        let values: Vec<f64> = open.iter().map(|share| asked.range.at(*share)).collect();
        let solved = bench.models(asked, &loads, &values)?;
        interpolation = open
            .iter()
            .zip(&solved)
            .flat_map(|(share, model)| {
                let between = curve.at(*share);
                between
                    .into_iter()
                    .zip(model.clone())
                    .map(|(a, b)| (a - b).abs())
            })
            .fold(0.0, f64::max);
        for (share, model) in open.into_iter().zip(solved) {
            curve.insert(share, model);
        }
        (likelihood, scatter) = self::likelihood(&target, &curve, &other.nuisance)?;
        profile = Profile::of(&curve, &likelihood, &target);
        if interpolation < FINE_ENOUGH * likelihood.whole {
            break;
        }
    }
    let mut answer = Answer {
        title: other.title,
        field: other.field,
        planes: other.planes,
        nodes: curve
            .nodes()
            .iter()
            .map(|node| asked.range.at(node.0))
            .collect(),
        interpolation,
        measured: likelihood.measured,
        other: (likelihood.whole.powi(2) - likelihood.measured.powi(2))
            .max(0.0)
            .sqrt(),
        whole: likelihood.whole,
        scatter,
        inputs: other.inputs,
        contact_share: other.contact_share,
        numerical_error: other.numerical_error,
        readings: readings.rows.len(),
        threshold: likelihood.threshold,
        profile,
        cautions: Vec::new(),
    };
    answer.cautions = cautions::of(asked, &answer);
    Ok(answer)
}

fn likelihood(
    target: &Target,
    curve: &Curve,
    nuisance: &Nuisance,
) -> Result<(Likelihood, Option<f64>), Failure> {
    let scatter = match target.deviations {
        Some(_) => None,
        None => Some(least_scatter(target, curve)?),
    };
    let found = Likelihood::of(target, nuisance, scatter).ok_or(Failure::Likelihood(
        "their covariance is not positive; is a standard deviation all but zero?",
    ))?;
    Ok((found, scatter.map(|(scatter, _)| scatter)))
}

/// Scatter of the readings where the model follows them best.
fn least_scatter(target: &Target, curve: &Curve) -> Result<(f64, f64), Failure> {
    let found = curve
        .nodes()
        .iter()
        .filter_map(|(_, model)| target.scatter(model));
    found.min_by(|one, other| one.0.total_cmp(&other.0)).ok_or_else(|| {
        question(
            "readings without `sigma` tell their scatter only when three or more of them differ",
            "add a column `sigma [%]` with the standard deviation of every reading",
        )
    })
}

/// The readings with the loads they were taken at, each load once.
fn target(readings: &Readings) -> Result<(Target, Vec<Load>), Failure> {
    if readings.ordinate.is_per_area() {
        return Err(question(
            "h and R in m²·K/W are of a face, and an unknown is fitted to what the whole joint conducts",
            "give W/K or K/W between the planes of the joint",
        ));
    }
    if readings.rows.len() > MOST_READINGS {
        return Err(question(
            format!(
                "{} readings are too many to hold against a model",
                readings.rows.len()
            ),
            format!("give {MOST_READINGS} at most; average what was repeated"),
        ));
    }
    let kind = match readings.abscissa {
        Some(Abscissa::Pressure) => {
            return Err(question(
                "a joint is tightened by torque or force, not by pressure",
                "give a column `torque [N·m]` or `force [kN]`, or none for the joint as it is stated",
            ));
        }
        Some(Abscissa::Force) => Load::Force,
        Some(Abscissa::Torque) => Load::Torque,
        None => |_| Load::Stated,
    };
    let mut loads: Vec<Load> = Vec::new();
    let mut levels = Vec::with_capacity(readings.rows.len());
    for row in &readings.rows {
        let load = row.abscissa.map_or(Load::Stated, kind);
        let level = loads
            .iter()
            .position(|known| *known == load)
            .unwrap_or_else(|| {
                loads.push(load);
                loads.len() - 1
            });
        levels.push(level);
    }
    let deviations: Option<Vec<f64>> = readings.rows.iter().map(|row| row.deviation).collect();
    Ok((
        Target {
            values: readings
                .rows
                .iter()
                .map(|row| row.conductance.ln())
                .collect(),
            levels,
            deviations,
        },
        loads,
    ))
}

/// How the joint was tightened for a reading.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Load {
    /// As the file states.
    Stated,
    /// With this torque on every bolt, N m.
    Torque(f64),
    /// To this force of every bolt, N.
    Force(f64),
}
