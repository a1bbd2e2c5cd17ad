//! The thermal part of the report: results with their planes, verdict, cases, drivers.

use crate::{
    estimate::{
        Band, Bend, CaseResult, Checkpoint, Driver, Estimate, Met, RequirementResult, Sampling,
    },
    joint::{Limit, Plane, RequirementKind},
    report::{
        number::{band, four, inverse, optional, percent, spread, wrapped},
        table::{Side, aligned},
        text::{WIDTH, wrapped_after},
    },
    units::{Shown, System},
};
use std::fmt::Write;

/// 0 °C, K.
pub(in crate::report) const ICE_POINT: f64 = 273.15;
/// International inch, m.
const INCH: f64 = 0.0254;

/// The results with their planes: contact only and with spreading, never one for the other.
pub fn results(estimate: &Estimate, case: &CaseResult, units: System) -> String {
    let results = &case.results;
    let named = [
        (
            "contact only",
            &results.contact,
            "finishes, fillers, torque",
        ),
        ("node to node", &results.node_to_node, "one node per plate"),
        (
            "added by joint",
            &results.added_by_joint,
            "what the joint costs",
        ),
        ("source to sink", &results.source_to_sink, "the requirement"),
        (
            "perfect contact",
            &results.perfect_contact,
            "the floor: no interface",
        ),
    ];
    let rows: Vec<Vec<String>> = named
        .iter()
        .map(|(name, result, purpose)| {
            let mut row = vec![(*name).to_owned()];
            row.extend(band(&result.resistance, 1.0));
            row.extend(inverse(&result.resistance).map(optional));
            row.push((*purpose).to_owned());
            row
        })
        .collect();
    let right = Side::Right;
    let heading = if estimate.cases.len() > 1 {
        format!("thermal result\n{} case", case.name)
    } else {
        "thermal result".to_owned()
    };
    let mut text = aligned(
        &[
            (heading.as_str(), Side::Left),
            ("K/W\nlow", right),
            ("K/W\nnominal", right),
            ("K/W\nhigh", right),
            ("W/K\nlow", right),
            ("W/K\nnominal", right),
            ("W/K\nhigh", right),
            ("\nuse it for", Side::Left),
        ],
        &rows,
    );
    if units == System::Inch {
        text.push_str(&customary(
            &named.map(|(name, result, _)| (name, &result.resistance)),
        ));
    }
    text.push_str(
        "Contact only leaves out how heat spreads to the bolts; all other rows hold that spreading.\n",
    );
    if case.interfaces.len() > 1 {
        text.push_str(&wrapped(
            "Contact only is that of all interfaces in series; node to node stands between the first and the last plate.",
            WIDTH,
            2,
        ));
        text.push('\n');
    }
    text.push_str(&scaled(case));
    text.push_str(&bounds(case));
    text.push_str(&case.sampling.as_ref().map_or_else(String::new, sampling));
    if let Some(told) = bent(case) {
        let _ = writeln!(text, "{}", wrapped(&told, WIDTH, 2));
    }
    text
}

/// Source to sink by the way the faces are bent, where that is worth a word.
pub(in crate::report) fn bent(case: &CaseResult) -> Option<String> {
    let bent = case.bent?;
    [Limit::Most, Limit::Least]
        .into_iter()
        .find_map(|bound| bent.worst(bound))?;
    let ways = Bend::ALL
        .iter()
        .zip(bent.0)
        .map(|(way, [low, high])| format!("{} {} to {}", way.name(), four(low), four(high)));
    Some(format!(
        "flatness leaves open which way faces are bent, low and high hold for each: source to sink {} K/W",
        ways.collect::<Vec<String>>().join(", ")
    ))
}

/// The results once more as a network in Btu, hours and degrees Fahrenheit takes them.
fn customary(named: &[(&str, &Band)]) -> String {
    // The heat of 1 Btu/(h·°F) in W/K; exact.
    let unit = System::Inch.unit(Shown::Conductance).size * 144.0 * INCH * INCH;
    let rows: Vec<Vec<String>> = named
        .iter()
        .map(|(name, resistance)| {
            let mut row = vec![(*name).to_owned()];
            row.extend(band(resistance, unit.recip()));
            row.extend(inverse(resistance).map(|value| optional(value.map(|each| each / unit))));
            row
        })
        .collect();
    let right = Side::Right;
    let table = aligned(
        &[
            ("the same", Side::Left),
            ("\nlow", right),
            ("°F·h/Btu\nnominal", right),
            ("\nhigh", right),
            ("\nlow", right),
            ("Btu/(h·°F)\nnominal", right),
            ("\nhigh", right),
        ],
        &rows,
    );
    format!("K/W is °C/W, W/K is W/°C; a rise of 1 K is one of 1.8 °F\n\n{table}")
}

/// How the ends of source to sink settle with the draws, with one standard error.
fn sampling(sampling: &Sampling) -> String {
    let end = |of: fn(&Checkpoint) -> f64, error: f64| {
        let values: Vec<f64> = sampling.course.iter().map(of).collect();
        let last = values.last().copied().unwrap_or(f64::NAN);
        let values: Vec<String> = values.into_iter().map(four).collect();
        format!("{} ± {}", values.join(", "), percent(error / last))
    };
    let line = format!(
        "source to sink after ¼, ½, all draws: low {}; high {}",
        end(|point| point.low, sampling.source_to_sink[0]),
        end(|point| point.high, sampling.source_to_sink[1]),
    );
    format!("{}\n", wrapped(&line, WIDTH, 2))
}

/// Least and most with every input at the end that leads there, beside the band of the draws.
pub fn worst(estimate: &Estimate, case: &CaseResult) -> String {
    let Some(worst) = case.worst else {
        return String::new();
    };
    let told =
        |name: &str, [least, most]: [f64; 2]| format!("{name} {} to {}", four(least), four(most));
    let all = [
        told("contact only", worst.contact),
        told("node to node", worst.node_to_node),
        told("added by joint", worst.added_by_joint),
        told("source to sink", worst.source_to_sink),
    ];
    let line = format!(
        "worst cases K/W{}, every input at its end (3 sigma where it has none), bolts {}: {}",
        of_case(estimate, case),
        estimate.bolts_scatter,
        all.join("; ")
    );
    format!("{}\n", wrapped(&line, WIDTH, 2))
}

/// Which case is spoken of, where there are several.
fn of_case(estimate: &Estimate, case: &CaseResult) -> String {
    if estimate.cases.len() > 1 {
        format!(", {} case", case.name)
    } else {
        String::new()
    }
}

/// The conductances per area and per bolt, for those who must compare.
fn scaled(case: &CaseResult) -> String {
    let nominal = |resistance: &Band| inverse(resistance)[1].unwrap_or(f64::NAN);
    let contact = nominal(&case.results.contact.resistance);
    let whole = nominal(&case.results.source_to_sink.resistance);
    let clamping = case.bolts.iter().filter(|bolt| !bolt.missing).count();
    let count = clamping.max(1) as f64;
    let mut text = format!(
        "per footprint of {} cm²: contact only {} W/(m²·K), source to sink {} W/(m²·K)\n",
        four(case.footprint * 1e4),
        four(contact / case.footprint),
        four(whole / case.footprint),
    );
    let _ = write!(
        text,
        "per bolt: contact only {} W/K, source to sink {} W/K",
        four(contact / count),
        four(whole / count),
    );
    text.push_str(if clamping > 1 {
        " (spreading: do not multiply)\n"
    } else {
        "\n"
    });
    text
}

fn bounds(case: &CaseResult) -> String {
    let name = "bounds of source to sink, for this field at nominal inputs";
    match (case.resistance_lower, case.resistance_upper) {
        (None, None) => String::new(),
        (Some(lower), None) => {
            format!("{name}: from {} K/W; no upper one is proved\n", four(lower))
        }
        (lower, Some(upper)) => format!("{name}: {} to {} K/W\n", optional(lower), four(upper)),
    }
}

/// Temperature rise and how the requirement stands.
pub fn verdict(estimate: &Estimate, case: &CaseResult) -> String {
    let mut text = String::new();
    if let Some(rise) = case.rise {
        let _ = write!(
            text,
            "rise above the sink surface{} at {} W: {} K; hottest point {} K; across the faces {} K",
            of_case(estimate, case),
            optional(estimate.heat),
            spread(&rise.source, 1.0).replace("  ", " "),
            four(rise.hottest.nominal),
            four(rise.interface_drop.nominal),
        );
        if let Some(drop) = rise.coolant_drop {
            let _ = write!(text, "; sink surface to coolant {} K", four(drop));
            if let Some([low, high]) = rise.coolant_drop_ends {
                let _ = write!(text, " ({} to {})", four(low), four(high));
            }
        }
        if case.sink_radiates {
            let _ = write!(
                text,
                "; the radiating sink surface settles at {:.1} °C",
                case.sink_temperature - ICE_POINT
            );
        }
        text = wrapped(&text, WIDTH, 2);
        text.push('\n');
    }
    if let Some((name, requirement)) = estimate.requirement() {
        let mut line = required(requirement, estimate.draws);
        if estimate.cases.len() > 1 {
            let _ = write!(line, " ({name} case, the worst)");
        }
        if let Some(why) = estimate.met_of_heat_alone() {
            let _ = write!(line, "; of heat alone: {why}, see the cautions");
        }
        text.push_str(&wrapped(&line, WIDTH, 2));
        text.push('\n');
    }
    text
}

/// The requirement and how the joint stands to it.
pub(in crate::report) fn required(requirement: &RequirementResult, draws: u32) -> String {
    let (quantity, unit) = match requirement.kind {
        RequirementKind::Rise => ("rise above the sink surface".to_owned(), "K"),
        RequirementKind::HottestRise => ("rise of the hottest point".to_owned(), "K"),
        RequirementKind::AboveCoolant => ("rise above the coolant".to_owned(), "K"),
        RequirementKind::HottestAboveCoolant => (
            "rise of the hottest point above the coolant".to_owned(),
            "K",
        ),
        RequirementKind::InterfaceDrop => ("drop across the faces".to_owned(), "K"),
        RequirementKind::Resistance(plane) => (format!("resistance {}", plane_name(plane)), "K/W"),
        RequirementKind::Conductance(plane) => {
            (format!("conductance {}", plane_name(plane)), "W/K")
        }
    };
    let bound = match requirement.bound {
        Limit::Most => "at most",
        Limit::Least => "at least",
    };
    let value = four(requirement.value);
    let verdict = match requirement.met {
        Met::Yes => format!("MET, {value} {unit} at the unfavourable end"),
        Met::No => format!("NOT MET, {value} {unit}"),
        Met::Uncertain if draws == 0 => {
            format!("UNCERTAIN: met at nominal, {value} {unit}; no low and high were drawn")
        }
        Met::Uncertain => {
            format!("UNCERTAIN: met at nominal, {value} {unit} at the unfavourable end")
        }
    };
    format!(
        "requirement: {quantity} {bound} {} {unit}: {verdict}{}",
        four(requirement.limit),
        held_against(requirement).unwrap_or_default()
    )
}

/// Against which way of the faces a requirement is held, where that makes a difference.
fn held_against(requirement: &RequirementResult) -> Option<String> {
    let bent = requirement.bent?;
    let worst = bent.worst(requirement.bound)?;
    let ends = bent.unfavourable(requirement.bound);
    let ends = ends.map(|(way, end)| format!("{} {}", way.name(), four(end)));
    Some(format!(
        " (faces {}; held against {})",
        ends.join(", "),
        worst.name()
    ))
}

fn plane_name(plane: Plane) -> &'static str {
    match plane {
        Plane::Contact => "of the contact only",
        Plane::NodeToNode => "node to node",
        Plane::AddedByJoint => "added by the joint",
        Plane::SourceToSink => "source to sink",
    }
}

/// Hot and cold side by side.
pub fn cases(estimate: &Estimate, units: System) -> String {
    let force = units.unit(Shown::Force);
    let (_, degree) = units.temperature(0.0);
    let columns = &estimate.cases;
    let row = |name: &str, cell: &dyn Fn(&CaseResult) -> String| {
        let mut row = vec![name.to_owned()];
        row.extend(columns.iter().map(cell));
        row
    };
    let mut rows = vec![
        row(&format!("sink surface, {degree}"), &|case| {
            format!("{:.1}", units.temperature(case.sink_temperature).0)
        }),
        row(
            &format!("clamp force in service, {}", force.name),
            &|case| {
                case.bolts
                    .iter()
                    .find(|bolt| !bolt.missing)
                    .map_or_else(String::new, |bolt| {
                        spread(&bolt.force_in_service, force.size)
                    })
            },
        ),
        row("contact only, K/W", &|case| {
            spread(&case.results.contact.resistance, 1.0)
        }),
        row("added by joint, K/W", &|case| {
            spread(&case.results.added_by_joint.resistance, 1.0)
        }),
        row("source to sink, K/W", &|case| {
            spread(&case.results.source_to_sink.resistance, 1.0)
        }),
    ];
    if columns.iter().any(|case| case.worst.is_some()) {
        rows.push(row("worst cases, K/W", &|case| {
            case.worst.map_or_else(String::new, |worst| {
                let [least, most] = worst.source_to_sink;
                format!("{} to {}", four(least), four(most))
            })
        }));
    }
    if columns.iter().any(|case| case.rise.is_some()) {
        rows.push(row("rise, K", &|case| {
            case.rise
                .map_or_else(String::new, |rise| spread(&rise.source, 1.0))
        }));
    }
    if columns.iter().any(|case| case.requirement.is_some()) {
        rows.push(row("requirement", &|case| {
            case.requirement.map_or_else(String::new, |each| {
                match each.met {
                    Met::Yes => "met",
                    Met::No => "NOT MET",
                    Met::Uncertain => "uncertain",
                }
                .to_owned()
            })
        }));
    }
    let mut headings = vec![("case", Side::Left)];
    headings.extend(columns.iter().map(|case| (case.name, Side::Left)));
    aligned(&headings, &rows)
}

/// What the spread of a case comes from and what to do about it.
pub fn drivers(estimate: &Estimate, case: &CaseResult) -> String {
    let drivers = &case.drivers;
    if drivers.is_empty() {
        return String::new();
    }
    let mut text = format!(
        "what drives the spread of source to sink{}\n",
        of_case(estimate, case)
    );
    // Below one part in a hundred nothing is worth a line.
    let told: Vec<&Driver> = drivers
        .iter()
        .filter(|driver| driver.share >= 0.01)
        .take(5)
        .collect();
    let widest = told.iter().map(|driver| driver.input.chars().count()).max();
    let name = widest.unwrap_or(0);
    for driver in told {
        let line = format!(
            "{:>4.0} %  {:<name$}  {}",
            driver.share * 100.0,
            driver.input,
            driver.remedy
        );
        let _ = writeln!(text, "{}", wrapped_after(&line, name + 10));
    }
    text
}
