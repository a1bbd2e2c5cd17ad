//! The layouts of a search as JSON.

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    layout::{Answer, Defaults, InCase, Row, Verdict},
    report::{
        arrange::verdict,
        json::{HEAD, Head, bound},
    },
};

/// What `arrange --json` prints of a joint.
#[derive(Serialize, JsonSchema)]
pub struct ArrangeResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The joint file
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "String")]
    file: Option<String>,
    /// Title of the joint
    title: String,
    /// The thermal cases, all of which are solved
    cases: Vec<&'static str>,
    /// The case that is screened
    screened_case: &'static str,
    /// Groups of fasteners that stay as they are
    fixed_groups: Vec<String>,
    /// What is made small
    #[schemars(extend("enum" = ["bolts", "mass", "resistance"]))]
    goal: &'static str,
    /// The judged quantity
    #[schemars(extend("enum" = [
        "source to sink", "hottest point to sink", "drop across the interface", "node to node",
        "added by the joint", "contact only"
    ]))]
    quantity: &'static str,
    /// Its limit; null where nothing is required
    limit: Option<LayoutLimit>,
    /// Whether the search ended by itself
    complete: bool,
    /// Layouts by rule that were screened
    layouts_by_rule: usize,
    /// Layouts, the cheapest first
    rows: Vec<LayoutTold>,
    /// Index of the row that answers, counted from 0; null where none does
    best: Option<usize>,
    /// Fields of the joint file that the screening passes over
    passed_over: Vec<String>,
    /// What the file does not state
    assumptions: Vec<TakenTold>,
}

/// The limit of the judged quantity.
#[derive(Serialize, JsonSchema)]
struct LayoutLimit {
    /// The limit as a resistance, K/W
    resistance: f64,
    /// Its side
    #[schemars(extend("enum" = ["most", "least"]))]
    bound: &'static str,
}

/// A value that `[arrange]` does not state.
#[derive(Serialize, JsonSchema)]
struct TakenTold {
    /// The field that would state it
    field: String,
    /// The value taken
    value: String,
}

/// A layout.
#[derive(Serialize, JsonSchema)]
struct LayoutTold {
    /// Number of bolts
    bolts: usize,
    /// What the fastener is called
    fastener: String,
    /// Its place in `arrange.sizes`, counted from 1; null for the fastener as stated
    size: Option<usize>,
    /// Torque, N m; null where a preload is stated
    torque: Option<f64>,
    /// Family of the pattern
    pattern: &'static str,
    /// Whether places were moved off the pattern
    moved: bool,
    /// Mass of the fasteners, kg
    mass: f64,
    /// How many heads reach over a heated zone
    heads_over_heat: usize,
    /// Places in joint coordinates, m
    at: Vec<[f64; 2]>,
    /// The judged quantity by the screening, K/W
    screened: f64,
    /// The solved field in the case that governs; null where it was not solved
    resistance: Option<LayoutCase>,
    /// The solved field in every case; null where it was not solved
    cases: Option<Vec<LayoutCase>>,
    /// Whether it meets the requirement
    #[schemars(extend("enum" = ["yes", "by force", "nominal only", "no", "not solved", "failed"]))]
    meets: &'static str,
    /// Why the solved field refused it; null where it did not
    failure: Option<String>,
    /// Whether no other row costs less and conducts better
    front: bool,
}

/// A layout on the solved field in one case.
#[derive(Clone, Serialize, JsonSchema)]
struct LayoutCase {
    /// The thermal case
    #[schemars(extend("enum" = ["service", "hot", "cold"]))]
    case: &'static str,
    /// Heated zone to sink surface at nominal inputs, K/W
    source_to_sink: f64,
    /// The judged quantity at nominal inputs, K/W
    nominal: f64,
    /// The judged quantity at the least force, K/W
    least_force: f64,
    /// The judged quantity at the largest force, K/W
    largest_force: f64,
    /// 5 % quantile of the judged quantity, K/W; null where none was drawn
    low: Option<f64>,
    /// 95 % quantile of the judged quantity, K/W; null where none was drawn
    high: Option<f64>,
}

/// The search as JSON, SI.
pub fn json(answer: &Answer, defaults: &Defaults) -> Value {
    let taken = defaults.taken.iter().map(|(key, value)| TakenTold {
        field: format!("arrange.{key}"),
        value: value.clone(),
    });
    json!(ArrangeResult {
        head: HEAD,
        file: None,
        title: answer.title.clone(),
        cases: answer.cases.clone(),
        screened_case: answer.screened_case,
        fixed_groups: answer.fixed.clone(),
        goal: answer.goal.name(),
        quantity: answer.target.measure.name(),
        limit: answer.target.limit.map(|(resistance, side)| LayoutLimit {
            resistance,
            bound: bound(side),
        }),
        complete: answer.complete,
        layouts_by_rule: answer.rules,
        rows: answer.rows.iter().map(|each| row(answer, each)).collect(),
        best: answer.best,
        passed_over: answer.passed_over.clone(),
        assumptions: taken.collect(),
    })
}

fn row(answer: &Answer, row: &Row) -> LayoutTold {
    let in_case = |(index, case): (usize, &InCase)| {
        let band = row.band.as_ref().and_then(|band| band.get(index));
        LayoutCase {
            case: answer.cases[index],
            source_to_sink: case.source_to_sink,
            nominal: case.nominal,
            least_force: case.least_force,
            largest_force: case.largest_force,
            low: band.map(|[low, _]| *low),
            high: band.map(|[_, high]| *high),
        }
    };
    let cases = row.solution.as_ref().map(|solution| {
        let cases = solution.cases.iter().enumerate();
        cases.map(in_case).collect::<Vec<LayoutCase>>()
    });
    LayoutTold {
        bolts: row.places.len(),
        fastener: row.label.clone(),
        size: row.size.map(|size| size + 1),
        torque: row.torque,
        pattern: row.family.name(),
        moved: row.refined,
        mass: row.mass,
        heads_over_heat: row.over_heat,
        at: row.places.clone(),
        screened: row.screened,
        resistance: cases
            .as_ref()
            .and_then(|cases| cases.get(row.case))
            .cloned(),
        cases,
        meets: verdict(row),
        failure: match &row.verdict {
            Verdict::Failed(failure) => Some(failure.clone()),
            _ => None,
        },
        front: row.front,
    }
}
