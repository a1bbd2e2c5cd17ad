//! Results of a page: the headline, each case with its planes, media side by side.

use std::fmt::Write;

use crate::{
    diagnostic::{
        Caution,
        registry::{self, Gravity},
    },
    estimate::{CaseResult, Estimate, Met},
    report::{
        media::vacuum_over,
        number::{band, four, inverse, optional, percent, spread},
        page::table::{Table, numbers, words},
        text::thermal::{ICE_POINT, bent, required},
    },
    uncertainty::InMedium,
};

/// What the page says first.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Headline {
    /// The quantity.
    pub(super) name: &'static str,
    /// Low, nominal and high.
    pub(super) values: [String; 3],
    /// Their unit.
    pub(super) unit: &'static str,
    /// Between which planes, and in which case.
    pub(super) planes: String,
    /// The requirement in words.
    pub(super) verdict: String,
    /// How it stands: `yes`, `no`, `open` or empty.
    pub(super) met: &'static str,
    /// Grave cautions by their codes; empty where there is none.
    pub(super) grave: String,
}

/// Source to sink at the case that stands worst to the requirement, else at the first.
pub(super) fn headline(estimate: &Estimate) -> Headline {
    let asked = estimate.requirement();
    let case = estimate.decisive();
    let values = case.map_or_else(Default::default, |case| {
        band(&case.results.source_to_sink.resistance, 1.0)
    });
    let name = case.map_or("", |case| case.name);
    Headline {
        name: "Source to sink",
        values,
        unit: "K/W",
        planes: format!(
            "from {} to {}; {name} case",
            estimate.source_plane, estimate.sink_plane
        ),
        verdict: asked.map_or_else(
            || "The file states no requirement.".to_owned(),
            |(_, result)| {
                let mut told = required(result, estimate.draws);
                if let Some(why) = estimate.met_of_heat_alone() {
                    let _ = write!(told, "; of heat alone: {why}, see the cautions");
                }
                sentence(&told)
            },
        ),
        grave: grave(&estimate.cautions),
        met: asked.map_or("", |(_, result)| match result.met {
            // Heat alone is met where strength or clamp force is not.
            Met::Yes if estimate.met_of_heat_alone().is_some() => "open",
            Met::Yes => "yes",
            Met::No => "no",
            Met::Uncertain => "open",
        }),
    }
}

/// How many cautions are grave, and which.
fn grave(cautions: &[Caution]) -> String {
    let mut codes: Vec<&str> = cautions
        .iter()
        .map(|caution| caution.code)
        .filter(|code| registry::gravity(code) == Gravity::Grave)
        .collect();
    let count = codes.len();
    codes.dedup();
    match count {
        0 => String::new(),
        1 => format!("1 grave caution: {}", codes.join(", ")),
        _ => format!("{count} grave cautions: {}", codes.join(", ")),
    }
}

/// A text as a sentence: a capital before it, a full stop behind.
pub(super) fn sentence(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map_or_else(String::new, |first| {
        format!("{}{}.", first.to_uppercase(), letters.as_str())
    })
}

/// One thermal case.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Case {
    /// Its name.
    pub(super) name: &'static str,
    /// Sink temperature in words.
    pub(super) sink: String,
    /// The results between their planes.
    pub(super) table: Table,
    /// Temperatures and bounds, a sentence each.
    pub(super) told: Vec<String>,
}

/// Every case.
pub(super) fn cases(estimate: &Estimate) -> Vec<Case> {
    let cases = estimate.cases.iter();
    cases
        .map(|case| Case {
            name: case.name,
            sink: format!("sink surface {:.1} °C", case.sink_temperature - ICE_POINT)
                .replace('-', "−"),
            table: results(case),
            told: told(estimate, case),
        })
        .collect()
}

fn results(case: &CaseResult) -> Table {
    let mut table = Table::new(
        "",
        format!(
            "Results of the {} case; low and high are those of the resistance",
            case.name
        ),
        vec![
            words("result"),
            words("between which planes"),
            numbers("low", "K/W"),
            numbers("nominal", "K/W"),
            numbers("high", "K/W"),
            numbers("low", "W/K"),
            numbers("nominal", "W/K"),
            numbers("high", "W/K"),
        ],
    );
    let results = &case.results;
    for (name, planes, result, class) in [
        (
            "contact only",
            "the faying faces alone, without spreading",
            &results.contact,
            "",
        ),
        (
            "added by joint",
            "the path less the same path with perfect contact",
            &results.added_by_joint,
            "",
        ),
        (
            "node to node",
            "mean of the first plate to mean of the last",
            &results.node_to_node,
            "",
        ),
        (
            "source to sink",
            "heated zone to sink surface: the requirement",
            &results.source_to_sink,
            "strong",
        ),
        (
            "perfect contact",
            "the same path without an interface: the floor",
            &results.perfect_contact,
            "quiet",
        ),
    ] {
        let mut cells = vec![name.to_owned(), planes.to_owned()];
        cells.extend(band(&result.resistance, 1.0));
        cells.extend(inverse(&result.resistance).map(optional));
        table.styled(cells, class);
    }
    table
}

fn told(estimate: &Estimate, case: &CaseResult) -> Vec<String> {
    let mut told = Vec::new();
    if let (Some(rise), Some(heat)) = (case.rise, estimate.heat) {
        told.push(format!(
            "At {} W the source stands {} K above the sink surface, the hottest point {} K; {} K of it fall across the faces.",
            four(heat),
            spread(&rise.source, 1.0),
            four(rise.hottest.nominal),
            four(rise.interface_drop.nominal)
        ));
        if let Some(drop) = rise.coolant_drop {
            let ends = rise.coolant_drop_ends;
            let ends = ends.map_or_else(String::new, |[low, high]| {
                format!(" ({} to {})", four(low), four(high))
            });
            told.push(format!(
                "From sink surface to coolant: {}{ends} K more.",
                four(drop)
            ));
        }
    }
    if let Some(result) = &case.requirement {
        told.push(sentence(&required(result, estimate.draws)));
    }
    told.extend(bent(case).map(|told| sentence(&told)));
    if let Some(worst) = case.worst {
        let [least, most] = worst.source_to_sink;
        told.push(format!(
            "With every input at its end (3 sigma where it has none) source to sink lies between {} and {} K/W.",
            four(least),
            four(most)
        ));
    }
    if let Some(sampling) = &case.sampling {
        let [low, high] = sampling.source_to_sink;
        told.push(format!(
            "Sampling error of the ends of source to sink: {} and {} K/W (one standard error, {} scramblings).",
            four(low),
            four(high),
            sampling.scrambles
        ));
    }
    told.push(format!(
        "Numerical error {}. Per footprint of {} cm²: contact only {} W/(m²·K).",
        percent(case.numerical_error),
        four(case.footprint * 1e4),
        four(case.results.contact.resistance.nominal.recip() / case.footprint)
    ));
    told
}

/// The same joint in several media.
pub(super) fn media(media: &[InMedium], case: &str) -> Table {
    let mut table = Table::new(
        "media",
        format!("The joint in other media, {case} case, nominal"),
        vec![
            words("medium"),
            numbers("source to sink", "K/W"),
            numbers("added by joint", "K/W"),
            numbers("rise", "K"),
            numbers("vacuum adds", "times as much"),
        ],
    );
    for each in media {
        table.row(vec![
            each.medium.word(),
            four(each.source_to_sink.nominal),
            four(each.added_by_joint.nominal),
            optional(each.rise.map(|rise| rise.nominal)),
            optional(vacuum_over(media, each)),
        ]);
    }
    table
}
