//! One page that is handed over: everything about a joint in a single HTML file without a network.
//!
//! The page is plain HTML that reads and prints without a script; the script adds a slider over the
//! torque table, a read-out under the pointer and switches, and computes nothing.

mod answers;
mod inputs;
mod restated;
mod results;
mod steps;
mod table;
mod values;

use askama::Template;

use crate::{
    estimate::{CaseResult, Estimate, FieldMap, HeatMap, TorqueSweep},
    joint::{Joint, Stated},
    report::number::{brief, percent},
    uncertainty::{Comparison, InMedium, Ranking},
    units::{Shown, System},
};

use answers::{Told, Torque};
use results::{Case, Headline};
use steps::Step;
use table::Table;

/// A drawing for the page.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Figure {
    /// One `<svg>` element, its texts escaped.
    pub svg: String,
    /// The same for a narrow screen, with letters as large.
    pub narrow: String,
    /// What it shows, in a sentence.
    pub caption: String,
    /// Whether its pictures are maps over the plan, whose values are read under the pointer.
    pub plan: bool,
}

/// The drawings of a page, each where it belongs; none that was not drawn.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Figures {
    /// Plan and cut of the joint.
    pub joint: Option<Figure>,
    /// Fields over the plan, the section, conductance against radius.
    pub fields: Vec<Figure>,
    /// Resistance against torque.
    pub torque: Option<Figure>,
    /// What each input does.
    pub drivers: Option<Figure>,
    /// Variants side by side.
    pub comparison: Option<Figure>,
}

/// Fields whose values are read under the pointer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Fields<'a> {
    /// Pressure, gap and conductance.
    pub map: &'a FieldMap,
    /// Temperatures and flux; none for the cone.
    pub heat: Option<&'a HeatMap>,
    /// Heat for which temperatures are told, W; per watt when none.
    pub watts: Option<f64>,
}

/// The joint file as it was read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Source<'a> {
    /// Its name.
    pub name: &'a str,
    /// Its text.
    pub text: &'a str,
    /// SHA-256 of the text, hexadecimal.
    pub digest: &'a str,
    /// The command that makes the page again.
    pub command: &'a str,
}

/// Everything a page tells.
#[derive(Clone, Copy, Debug)]
pub struct Contents<'a> {
    /// The joint.
    pub joint: &'a Joint,
    /// The file it came from.
    pub source: Source<'a>,
    /// What the file states.
    pub stated: &'a [Stated],
    /// Low, nominal and high.
    pub estimate: &'a Estimate,
    /// The drawings.
    pub figures: &'a Figures,
    /// Values under the pointer.
    pub fields: Option<Fields<'a>>,
    /// Resistance against torque; none where no group is tightened by torque.
    pub torque: Option<&'a TorqueSweep>,
    /// The joint in other media.
    pub media: &'a [InMedium],
    /// What drives the band; none without draws.
    pub ranking: Option<&'a Ranking>,
    /// The variants of the file; none where it has none.
    pub comparison: Option<&'a Comparison>,
    /// Units of tables, sentences and values under the pointer; drawings are told in them already.
    pub units: System,
    /// What could not be computed or drawn, and why, a sentence each.
    pub left_out: &'a [String],
}

/// Longest joint file that is shown whole, bytes; a longer one would drown the page.
const LONGEST_SHOWN: usize = 40_000;

/// A line of the title block.
struct Entry {
    name: &'static str,
    value: String,
}

#[derive(Template)]
#[template(config = "src/report/page/askama.toml", path = "page.html")]
struct Page<'a> {
    title: &'a str,
    style: &'static str,
    script: &'static str,
    block: Vec<Entry>,
    headline: Headline,
    figures: &'a Figures,
    bolts: Table,
    inputs: Vec<Table>,
    steps: Vec<Step>,
    cases: Vec<Case>,
    media: Option<Table>,
    medium: String,
    values: Option<String>,
    pointed: String,
    torque: Option<Torque>,
    lever: &'static str,
    drivers: Option<Table>,
    comparison: Option<Table>,
    cautions: Vec<Told>,
    left_out: &'a [String],
    source: Source<'a>,
    text: Option<&'a str>,
    version: &'static str,
}

/// The page as one HTML document; texts from the file are escaped.
///
/// Error: a sentence, where the template cannot be filled.
pub fn page(contents: &Contents) -> Result<String, String> {
    let estimate = contents.estimate;
    let case = estimate.cases.first();
    let drivers = answers::drivers(
        contents.ranking,
        estimate.decisive().map_or(&[], |case| &case.drivers),
    );
    let name = case.map_or("", |case| case.name);
    let mut page = Page {
        title: &estimate.title,
        style: include_str!("page/style.css"),
        script: include_str!("page/script.js"),
        block: block(contents, case),
        headline: results::headline(estimate),
        figures: contents.figures,
        bolts: inputs::bolts(contents),
        inputs: inputs::tables(contents),
        steps: steps::steps(contents.joint, estimate),
        cases: results::cases(estimate),
        media: (!contents.media.is_empty()).then(|| results::media(contents.media, name)),
        medium: contents.joint.service.medium.word(),
        values: contents
            .fields
            .as_ref()
            .map(|fields| values::script(fields, contents.units)),
        pointed: pointed(contents.joint),
        torque: contents.torque.map(answers::torque),
        lever: contents.units.unit(Shown::Torque).name,
        drivers: (!drivers.rows.is_empty()).then_some(drivers),
        comparison: contents.comparison.map(answers::comparison),
        cautions: answers::cautions(&estimate.cautions),
        left_out: contents.left_out,
        source: contents.source,
        text: Some(contents.source.text).filter(|text| text.len() <= LONGEST_SHOWN),
        version: env!("CARGO_PKG_VERSION"),
    };
    page.restate(contents.units);
    page.render().map_err(|found| found.to_string())
}

/// Which maps are read under the pointer.
fn pointed(joint: &Joint) -> String {
    match joint.interfaces() {
        0 | 1 => "Point at a map to read its values.".to_owned(),
        _ => format!(
            "Point at a map of {} to read its values.",
            joint.interface_name(0)
        ),
    }
}

/// The title block, as drawings have one.
fn block(contents: &Contents, case: Option<&CaseResult>) -> Vec<Entry> {
    let estimate = contents.estimate;
    let entry = |name, value: String| Entry { name, value };
    let digest = contents.source.digest;
    let heat = estimate.heat.map_or_else(
        || "not stated".to_owned(),
        |heat| format!("{} W", brief(heat)),
    );
    vec![
        entry("joint file", contents.source.name.to_owned()),
        entry(
            "SHA-256",
            digest.get(..16).unwrap_or(digest).to_owned() + "…",
        ),
        entry(
            "field",
            format!("{}, {}", estimate.field, estimate.resolution),
        ),
        entry(
            "low and high",
            match estimate.draws {
                0 => "not drawn".to_owned(),
                draws => format!("5 % and 95 % of {draws} draws"),
            },
        ),
        entry("seed", estimate.seed.to_string()),
        entry(
            "numerical error",
            case.map_or_else(|| "–".to_owned(), |case| percent(case.numerical_error)),
        ),
        entry("heat", heat),
        entry("made by", format!("ringsum {}", env!("CARGO_PKG_VERSION"))),
    ]
}
