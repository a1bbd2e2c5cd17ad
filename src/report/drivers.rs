//! What drives a band, for the terminal and as JSON.

use std::fmt::Write;

use schemars::JsonSchema;
use serde::Serialize;
use serde_json::{Value, json};

use crate::{
    report::{
        json::{HEAD, Head},
        number::{cut, four, optional, percent, plain, wrapped},
        table::{Side, aligned},
        text::{WIDTH, told_in, wrapped_after},
    },
    uncertainty::{Ranking, Scale, Share},
    units::System,
};

/// Widest name in the table, characters.
const NAME: usize = 28;
/// Share of no input alone above which few extreme draws are behind the shares.
const MUCH: f64 = 0.5;
/// Total share, and share of the band, below which an input is not worth a remedy.
const WORTH_A_LINE: f64 = 0.01;

/// The ranking as a table, with what to do about the inputs that matter.
pub fn text(ranking: &Ranking) -> String {
    text_in(ranking, System::Si)
}

/// The ranking in a system of units.
pub fn text_in(ranking: &Ranking, units: System) -> String {
    let (target, unit) = (ranking.target.name(), ranking.target.unit());
    let rows: Vec<Vec<String>> = ranking
        .inputs
        .iter()
        .map(|input| {
            let [low, high] = [
                input.alone[0].min(input.alone[1]),
                input.alone[0].max(input.alone[1]),
            ];
            vec![
                cut(input.input, NAME),
                share(&input.index.first),
                share(&input.index.total),
                four(low),
                four(high),
                optional(input.known.low),
                optional(input.known.high),
                percent_less(input.narrowing(&ranking.band)),
            ]
        })
        .collect();
    let heading = |name: &str| format!("{name} {unit}");
    let (alone, known) = (heading("alone"), heading("known"));
    let right = Side::Right;
    let table = aligned(
        &[
            ("input", Side::Left),
            ("share %\nof its own", right),
            ("share %\nin total", right),
            (&format!("{alone}\nlow"), right),
            ("\nhigh", right),
            (&format!("{known}\nlow"), right),
            ("\nhigh", right),
            ("band\nless", right),
        ],
        &rows,
    );
    let mut text = format!("{}\n", plain(&ranking.title));
    let _ = writeln!(
        text,
        "what drives {target}, {} case; field {}, {}\n\
         ranked by how much narrower the band gets when the input is known\n\
         {} {unit}, low {} to high {}\n\n{table}",
        ranking.case,
        ranking.field,
        ranking.resolution,
        four(ranking.band.nominal),
        optional(ranking.band.low),
        optional(ranking.band.high),
    );
    let scale = match ranking.scale {
        Scale::Logarithm => format!("of the variance of the logarithm of {target}"),
        Scale::Itself => format!("of the variance of {target}"),
    };
    for line in [
        format!("share {scale}, ± its 95 % interval (? where it is wider than the share); of its own: what goes if this input alone is known; in total: what is left if all others are"),
        format!("{} belongs to no input alone", percent(ranking.interaction)),
        "alone: this input at its 5 % and 95 %, all others nominal; known: the band if this input were known to be nominal".to_owned(),
        if ranking.interaction > MUCH {
            "few extreme draws hold most of the variance: go by the order and the last columns, which look at the band from 5 % to 95 %".to_owned()
        } else {
            String::new()
        },
        not_told_apart(ranking).unwrap_or_default(),
        draws(ranking),
    ] {
        if line.is_empty() {
            continue;
        }
        let _ = writeln!(text, "{}", wrapped(&line, WIDTH, 2));
    }
    text.push_str(&told_in(&remedies(ranking), units));
    text
}

/// Shares that rank nothing.
pub(super) fn not_told_apart(ranking: &Ranking) -> Option<String> {
    let inputs = ranking.not_told_apart();
    (!inputs.is_empty()).then(|| {
        format!(
            "?: the interval is wider than the share, so that these cannot be told apart by it: {}; more `--draws` narrow it",
            inputs.join(", ")
        )
    })
}

fn draws(ranking: &Ranking) -> String {
    let mut line = format!(
        "{} draws for every band and as many base points for the shares, seed {}",
        ranking.draws, ranking.seed
    );
    if let Some(error) = ranking.draw_error {
        let _ = write!(
            line,
            "; read from surfaces through solved states, off by {} at the states solved to check them",
            percent(error)
        );
    }
    line
}

fn remedies(ranking: &Ranking) -> String {
    let told: Vec<_> = ranking
        .inputs
        .iter()
        .filter(|input| input.index.total.value.max(input.narrowing(&ranking.band)) >= WORTH_A_LINE)
        .take(6)
        .collect();
    if told.is_empty() {
        return String::new();
    }
    let widest = told.iter().map(|input| input.input.chars().count()).max();
    let name = widest.unwrap_or(0);
    let mut text = "\nwhat to do about it\n".to_owned();
    for input in told {
        let line = format!("  {:<name$}  {}", input.input, input.remedy);
        let _ = writeln!(text, "{}", wrapped_after(&line, name + 4));
    }
    text
}

/// A share in percent with its interval.
pub(super) fn share(share: &Share) -> String {
    if share.value.is_finite() {
        // No minus before a zero.
        let tenth = |value: f64| (1000.0 * value).round() / 10.0 + 0.0;
        let doubt = if share.is_told() { "" } else { "?" };
        format!(
            "{:.1} ± {:.1}{doubt}",
            tenth(share.value),
            tenth(share.confidence)
        )
    } else {
        "–".to_owned()
    }
}

fn percent_less(share: f64) -> String {
    if share.is_finite() {
        // No minus before a zero.
        format!("{:.0} %", (100.0 * share).round() + 0.0)
    } else {
        "–".to_owned()
    }
}

/// What `drivers --json` prints of a joint.
#[derive(Serialize, JsonSchema)]
pub(super) struct DriversResult {
    /// What made it
    #[serde(flatten)]
    head: Head,
    /// The joint file
    #[serde(skip_serializing_if = "Option::is_none")]
    #[schemars(with = "String")]
    file: Option<String>,
    /// Title of the joint
    title: String,
    /// The thermal case that stands worst
    #[schemars(extend("enum" = ["service", "hot", "cold"]))]
    case: &'static str,
    /// The field of pressure
    #[schemars(extend("enum" = ["elastic", "cone"]))]
    field: &'static str,
    /// How finely it is solved
    #[schemars(extend("enum" = ["fast", "normal", "fine"]))]
    resolution: &'static str,
    /// The answer whose band is told
    #[schemars(extend("enum" = [
        "source to sink", "contact only", "added by the joint", "node to node", "rise of the source"
    ]))]
    of: &'static str,
    /// Unit of the answer
    #[schemars(extend("enum" = ["K/W", "K"]))]
    unit: &'static str,
    /// Draws of every band, and base points of the shares
    draws: u32,
    /// Seed of the draws
    seed: u64,
    /// Largest error of the surfaces that the draws are read from, relative to source to sink; null where every draw is solved
    draw_error: Option<f64>,
    /// Whether the shares are those of the logarithm of the answer or of itself
    #[schemars(extend("enum" = ["logarithm", "itself"]))]
    scale: &'static str,
    /// 5 % quantile of the answer, in its unit; null without draws
    low: Option<f64>,
    /// The answer at nominal inputs, in its unit
    nominal: f64,
    /// 95 % quantile of the answer, in its unit; null without draws
    high: Option<f64>,
    /// Share of the variance that no input has alone, 1; null where nothing varies
    #[schemars(with = "Option<f64>")]
    interaction: f64,
    /// What the order of the inputs goes by
    #[schemars(extend("const" = "narrowing"))]
    ranked_by: &'static str,
    /// The inputs, the one first whose knowledge narrows the band most
    inputs: Vec<RankedTold>,
}

/// One input and what it does to the band.
#[derive(Serialize, JsonSchema)]
struct RankedTold {
    /// Its name
    input: &'static str,
    /// Share of the variance that goes if it alone is known
    first: ShareTold,
    /// Share of the variance that is left if all but it are known
    total: ShareTold,
    /// The answer with it alone at its 5 % and at its 95 % quantile, in the unit of the answer
    alone: [f64; 2],
    /// The band if it were known to be nominal, in the unit of the answer
    known: KnownBand,
    /// Share of the width of the band that goes when it is known, 1; null where the band has no width
    #[schemars(with = "Option<f64>")]
    narrowing: f64,
    /// Whether its total share is told apart from nothing
    told_apart: bool,
    /// What to do about it
    remedy: String,
}

/// A share of the variance.
#[derive(Serialize, JsonSchema)]
struct ShareTold {
    /// The share, 1; null where nothing varies
    #[schemars(with = "Option<f64>")]
    value: f64,
    /// Half the width of its 95 % interval, 1; null where nothing varies
    #[schemars(with = "Option<f64>")]
    confidence: f64,
}

impl From<&Share> for ShareTold {
    fn from(share: &Share) -> Self {
        Self {
            value: share.value,
            confidence: share.confidence,
        }
    }
}

/// A band with one input known.
#[derive(Serialize, JsonSchema)]
struct KnownBand {
    /// 5 % quantile, in the unit of the answer; null without draws
    low: Option<f64>,
    /// 95 % quantile, in the unit of the answer; null without draws
    high: Option<f64>,
}

/// The ranking in SI: shares of 1, the answer in K/W, or in K for the rise.
pub fn json(ranking: &Ranking) -> Value {
    let inputs = ranking.inputs.iter().map(|input| RankedTold {
        input: input.input,
        first: (&input.index.first).into(),
        total: (&input.index.total).into(),
        alone: input.alone,
        known: KnownBand {
            low: input.known.low,
            high: input.known.high,
        },
        narrowing: input.narrowing(&ranking.band),
        told_apart: input.index.total.is_told(),
        remedy: input.remedy.clone(),
    });
    json!(DriversResult {
        head: HEAD,
        file: None,
        title: ranking.title.clone(),
        case: ranking.case,
        field: ranking.field,
        resolution: ranking.resolution,
        of: ranking.target.name(),
        unit: ranking.target.unit(),
        draws: ranking.draws,
        seed: ranking.seed,
        draw_error: ranking.draw_error,
        scale: match ranking.scale {
            Scale::Logarithm => "logarithm",
            Scale::Itself => "itself",
        },
        low: ranking.band.low,
        nominal: ranking.band.nominal,
        high: ranking.band.high,
        interaction: ranking.interaction,
        ranked_by: "narrowing",
        inputs: inputs.collect(),
    })
}
