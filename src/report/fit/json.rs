//! Fits of own measurements as JSON.

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    fit::{
        Branch, Direction, Series, Shape,
        profile::Verdict,
        unknown::{Answer, Question},
    },
    report::{
        fit::measured,
        json::{CautionTold, HEAD, Head, cautions},
    },
};

/// What `fit --json` prints of a law or a table.
#[derive(Serialize, JsonSchema)]
pub struct SeriesResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The table of readings
    file: String,
    /// What was fitted
    #[schemars(extend("const" = "law"))]
    fit: &'static str,
    /// What was varied
    abscissa: &'static str,
    /// What was measured: a conductance in W/K, or contact conductance in W/(m² K)
    #[schemars(extend("enum" = ["contact conductance", "conductance"]))]
    ordinate: &'static str,
    /// One branch, or loading before unloading
    branches: Vec<BranchTold>,
    /// How far unloading lies above loading; null where both were not measured
    hysteresis: Option<HysteresisTold>,
    /// What to know of the fit
    cautions: Vec<CautionTold>,
    /// The block `[measured]` for a joint file
    measured: String,
}

/// The readings of one direction of load with their law or table.
#[derive(Serialize, JsonSchema)]
struct BranchTold {
    /// Loading or unloading; null where the table states none
    direction: Option<&'static str>,
    /// Number of readings
    readings: usize,
    /// Least and most of what was varied, SI
    range: [f64; 2],
    /// How far another joint may be off: one standard deviation as a factor, 1
    scatter_factor: f64,
    /// The power law; there where one was fitted
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "LawTold")]
    law: Option<LawTold>,
    /// The table; there where one was fitted
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "TableTold")]
    table: Option<TableTold>,
    /// Readings that stand apart from a power law; none is dropped
    outliers: Vec<OutlierTold>,
}

/// A power law: coefficient (x/reference)^exponent.
#[derive(Serialize, JsonSchema)]
struct LawTold {
    /// Reference of what was varied, SI
    reference: f64,
    /// Coefficient, SI
    coefficient: f64,
    /// Exponent, 1
    exponent: f64,
    /// Covariance of the logarithm of the coefficient and of the exponent, 1
    covariance: [[f64; 2]; 2],
    /// Standard deviation of one reading in its logarithm, 1
    scatter: f64,
    /// Readings less coefficients
    degrees_of_freedom: usize,
    /// Weighted sum of squares, 1; null where no deviations are stated
    chi_squared: Option<f64>,
    /// The same over the degrees of freedom, 1; null likewise
    reduced_chi_squared: Option<f64>,
    /// Chance of so much bend from readings of a power law, 0 to 1; null with too few readings
    bend_chance: Option<f64>,
    /// Standard deviations that bound 90 % of the band, 1
    reach: f64,
}

/// A table that never falls.
#[derive(Serialize, JsonSchema)]
struct TableTold {
    /// What was varied and the conductance, SI, both rising
    rows: Vec<[f64; 2]>,
    /// Standard deviation of one reading in its logarithm, 1
    scatter: f64,
}

/// A reading that stands apart.
#[derive(Serialize, JsonSchema)]
struct OutlierTold {
    /// Line of the table, counted from 1
    line: usize,
    /// Distance from the law over its standard deviation, 1
    residual: f64,
    /// What it must exceed to be told, 1
    threshold: f64,
}

/// How far unloading lies above loading.
#[derive(Serialize, JsonSchema)]
struct HysteresisTold {
    /// Where both are compared, SI
    at: f64,
    /// Conductance on unloading over that on loading, 1
    ratio: f64,
    /// Its 90 % interval, 1; null between tables
    interval: Option<[f64; 2]>,
}

/// What `fit --unknown --json` prints.
#[derive(Serialize, JsonSchema)]
pub struct UnknownResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The table of readings
    file: String,
    /// What was fitted
    #[schemars(extend("const" = "unknown"))]
    fit: &'static str,
    /// Title of the joint
    title: String,
    /// The field of pressure
    #[schemars(extend("enum" = ["elastic", "cone"]))]
    field: &'static str,
    /// Between which planes was measured
    planes: String,
    /// The unknown
    unknown: String,
    /// Between which values it is sought, in the unit asked for
    range: [f64; 2],
    /// Its likeliest value
    best: BestTold,
    /// Its 90 % interval, in the unit asked for
    interval: [f64; 2],
    /// Whether the readings determine it
    #[schemars(extend("enum" = ["determined", "bounded-below", "bounded-above", "not-determined"]))]
    verdict: &'static str,
    /// Number of readings
    readings: usize,
    /// Weighted sum of squares at the best value, 1
    chi_squared: f64,
    /// Chance of more than that, 0 to 1; null where no deviations are stated
    chance: Option<f64>,
    /// How far the model moves over the range, in the logarithm of the conductance
    movement: f64,
    /// Standard deviations in the logarithm of the conductance
    deviation: DeviationTold,
    /// Contact only as a share of the measured resistance, 1
    contact_share: f64,
    /// Numerical error of the model, share of 1
    numerical_error: f64,
    /// Largest error of reading between solved values, in the logarithm of the conductance
    interpolation: f64,
    /// Values at which the model was solved, in the unit asked for
    nodes: Vec<f64>,
    /// Names of the other inputs that were integrated out
    inputs: Vec<&'static str>,
    /// Value in the unit asked for, and its deviance
    profile: Vec<[f64; 2]>,
    /// What to know of the fit
    cautions: Vec<CautionTold>,
}

/// The likeliest value.
#[derive(Serialize, JsonSchema)]
struct BestTold {
    /// In the unit asked for
    value: f64,
    /// The same with its unit
    text: String,
}

/// Standard deviations in the logarithm of the conductance.
#[derive(Serialize, JsonSchema)]
struct DeviationTold {
    /// Of what the readings share
    readings: f64,
    /// Of the model by its other inputs
    other_inputs: f64,
    /// Of both together
    together: f64,
}

/// A fitted series in SI.
pub fn series_json(series: &Series, (name, block): (&str, &str)) -> Value {
    json!(SeriesResult {
        head: HEAD,
        file: name.to_owned(),
        fit: "law",
        abscissa: series.abscissa.name(),
        ordinate: measured(series.ordinate),
        branches: series.branches.iter().map(branch).collect(),
        hysteresis: series.hysteresis.map(|found| HysteresisTold {
            at: found.at,
            ratio: found.ratio,
            interval: found.interval,
        }),
        cautions: cautions(&series.cautions),
        measured: block.to_owned(),
    })
}

fn branch(branch: &Branch) -> BranchTold {
    let outliers = branch.outliers.iter().map(|outlier| OutlierTold {
        line: branch.readings[outlier.index].line,
        residual: outlier.residual,
        threshold: outlier.threshold,
    });
    let (law, table) = match &branch.shape {
        Shape::Law(law) => {
            let law = LawTold {
                reference: law.reference,
                coefficient: law.coefficient,
                exponent: law.exponent,
                covariance: law.covariance,
                scatter: law.scatter,
                degrees_of_freedom: law.degrees,
                chi_squared: law.agreement.map(|found| found.chi_squared),
                reduced_chi_squared: law.agreement.map(|found| found.reduced),
                bend_chance: law.bend.map(|bend| bend.chance),
                reach: law.reach,
            };
            (Some(law), None)
        }
        Shape::Table(table) => {
            let rows = table.rows.iter().map(|(x, y)| [*x, *y]);
            let table = TableTold {
                rows: rows.collect(),
                scatter: table.scatter,
            };
            (None, Some(table))
        }
    };
    BranchTold {
        direction: branch.direction.map(Direction::name),
        readings: branch.readings.len(),
        range: branch.range(),
        scatter_factor: branch.shape.factor(),
        law,
        table,
        outliers: outliers.collect(),
    }
}

/// A fitted unknown; values in the unit they were asked in, all else in SI.
pub fn answer_json(asked: &Question, answer: &Answer, name: &str) -> Value {
    let value = |share: f64| asked.range.at(share);
    let profile = &answer.profile;
    let curve = profile.curve.iter().step_by(20);
    json!(UnknownResult {
        head: HEAD,
        file: name.to_owned(),
        fit: "unknown",
        title: answer.title.clone(),
        field: answer.field,
        planes: answer.planes.clone(),
        unknown: asked.unknown.name().clone(),
        range: [asked.range.from, asked.range.to],
        best: BestTold {
            value: value(profile.best),
            text: asked.unknown.shown(value(profile.best)),
        },
        interval: profile.interval.map(value),
        verdict: verdict(profile.verdict),
        readings: answer.readings,
        chi_squared: profile.chi_squared,
        chance: profile.chance,
        movement: profile.movement,
        deviation: DeviationTold {
            readings: answer.measured,
            other_inputs: answer.other,
            together: answer.whole,
        },
        contact_share: answer.contact_share,
        numerical_error: answer.numerical_error,
        interpolation: answer.interpolation,
        nodes: answer.nodes.clone(),
        inputs: answer.inputs.clone(),
        profile: curve
            .map(|(share, deviance)| [value(*share), *deviance])
            .collect(),
        cautions: cautions(&answer.cautions),
    })
}

fn verdict(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Determined => "determined",
        Verdict::BelowOnly => "bounded-below",
        Verdict::AboveOnly => "bounded-above",
        Verdict::Undetermined => "not-determined",
    }
}
