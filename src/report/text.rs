//! The result of `estimate` for an engineer at a terminal: one screen, units in headings.

use crate::{
    diagnostic::{
        Assumption, Caution,
        registry::{Gravity, entry, gravity},
    },
    estimate::{BoltResult, CaseResult, Estimate},
    report::{
        number::{band, cut, optional, percent, plain, wrapped},
        table::{Side, aligned},
    },
    uncertainty::Verification,
    units::{Shown, System},
};
use anstyle::{AnsiColor, Style};
use std::fmt::Write;

mod axial;
mod pressure;
mod rings;
mod temperatures;
pub(super) mod thermal;

pub use rings::{ring_sum, rings};

/// Widest line, characters.
pub const WIDTH: usize = 100;

/// How much of the report is told.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Detail {
    /// One screen: cautions that are not grave are cut to a line, assumptions given without reason.
    Screen,
    /// Everything in full.
    Full,
    /// Assumptions are counted, and cautions that are not grave named by their codes.
    Brief,
}

/// The report on one screen.
pub fn estimate(estimate: &Estimate) -> String {
    estimate_at(estimate, Detail::Screen)
}

/// The report, as long as asked for.
pub fn estimate_at(estimate: &Estimate, detail: Detail) -> String {
    estimate_in(estimate, detail, System::Si)
}

/// The report in a system of units.
pub fn estimate_in(estimate: &Estimate, detail: Detail, units: System) -> String {
    let heading = heading(estimate);
    let mut parts = Vec::new();
    if let Some(case) = estimate.cases.first() {
        parts.push(bolts(case, detail, units));
        parts.push(thermal::results(estimate, case, units) + &thermal::worst(estimate, case));
        parts.push(thermal::verdict(estimate, case) + &temperatures::told(estimate, case));
        if estimate.cases.len() > 1 {
            parts.push(thermal::cases(estimate, units));
        }
        if let Some(decisive) = estimate.decisive() {
            parts.push(thermal::drivers(estimate, decisive));
        }
    }
    parts.push(cautions(&estimate.cautions, detail));
    parts.push(assumptions(&estimate.assumptions, detail));
    parts.retain(|part| !part.is_empty());
    // Title and planes stand as the file has them.
    format!("{heading}\n{}", told_in(&parts.join("\n"), units))
}

/// A finished text in a system of units, its sentences no longer than a screen is wide; rows of a table,
/// which have wide gaps between words, and labels stay as they are set.
pub(super) fn told_in(text: &str, units: System) -> String {
    told_around(text, (units, &[]))
}

/// The same with names that stand as they are.
pub(super) fn told_around(text: &str, (units, names): (System, &[String])) -> String {
    if units == System::Si {
        return text.to_owned();
    }
    let mut told = String::new();
    for line in units.restated_around(text, names).lines() {
        let indent = line.len() - line.trim_start().len();
        let parts = line.trim_start().split("  ");
        let gaps = parts
            .filter(|part| !part.is_empty())
            .count()
            .saturating_sub(1);
        if line.chars().count() <= WIDTH || gaps > 1 {
            let _ = writeln!(told, "{line}");
        } else if gaps == 1 {
            let rest = line.rfind("  ").map_or(indent, |at| at + 2);
            let _ = writeln!(
                told,
                "{}",
                wrapped_after(line, line[..rest].chars().count())
            );
        } else {
            let body = wrapped(line.trim_start(), WIDTH - indent, 2);
            let margin = " ".repeat(indent);
            let body = body.replace('\n', &format!("\n{margin}"));
            let _ = writeln!(told, "{margin}{body}");
        }
    }
    told
}

fn heading(estimate: &Estimate) -> String {
    let mut text = format!("{}\n", plain(&estimate.title));
    for (name, plane) in [
        ("from", &estimate.source_plane),
        ("to", &estimate.sink_plane),
    ] {
        let line = format!("{name:<6}{}", plain(plane));
        let _ = writeln!(text, "{}", wrapped_after(&line, 6));
    }
    let band = match estimate.draws {
        0 => "nominal only".to_owned(),
        draws => format!(
            "K/W low and high: 5 % and 95 % of {draws} draws, seed {}",
            estimate.seed
        ),
    };
    let error = estimate
        .cases
        .first()
        .map_or(f64::NAN, |case| case.numerical_error);
    let without = left_out(estimate);
    if !without.is_empty() {
        let numbers: Vec<String> = without.iter().map(ToString::to_string).collect();
        let _ = writeln!(
            text,
            "without bolt {}: the hole stays, no clamp force, no heat through the shank",
            numbers.join(", ")
        );
    }
    let _ = writeln!(
        text,
        "field {}, {}; {band}; numerical error {}",
        estimate.field,
        estimate.resolution,
        percent(error)
    );
    text
}

/// Numbers of the bolts that are left out, from 1.
pub(super) fn left_out(estimate: &Estimate) -> Vec<usize> {
    let bolts = estimate.cases.first().map_or(&[][..], |case| &case.bolts);
    let missing = bolts.iter().enumerate().filter(|(_, bolt)| bolt.missing);
    missing.map(|(bolt, _)| bolt + 1).collect()
}

/// Draws solved beside the surfaces that all draws are read from.
pub fn verification(found: Option<&Verification>) -> String {
    let line = match found {
        Some(found) => format!(
            "surfaces of the draws beside {} draws solved one by one: source to sink off by {} at most, {} on average",
            found.draws,
            percent(found.largest),
            percent(found.mean)
        ),
        None => "every draw is solved; there are no surfaces to verify".to_owned(),
    };
    format!("\n{}\n", wrapped(&line, WIDTH, 2))
}

/// Wraps behind a label of fixed width, which `wrapped` alone would close up.
pub(super) fn wrapped_after(line: &str, label: usize) -> String {
    let head: String = line.chars().take(label).collect();
    let rest: String = line.chars().skip(label).collect();
    let body = wrapped(&rest, WIDTH - label, 0);
    let indent = format!("\n{}", " ".repeat(label));
    format!("{head}{}", body.replace('\n', &indent))
}

/// Clamp force, one row for all bolts that share it, and the pressure that comes of it.
fn bolts(case: &CaseResult, detail: Detail, units: System) -> String {
    let [force, torque] = [Shown::Force, Shown::Torque].map(|shown| units.unit(shown));
    let mut rows = Vec::new();
    for (name, group) in groups(&case.bolts) {
        let bolt = group[0];
        if bolt.missing {
            let mut row = vec![format!("{name} left out")];
            row.extend(std::iter::repeat_n("–".to_owned(), 9));
            rows.push(row);
            continue;
        }
        let mut row = vec![name];
        row.extend(band(&bolt.force, force.size));
        row.extend(band(&bolt.force_in_service, force.size));
        row.push(
            bolt.strength_use
                .map_or_else(|| "–".to_owned(), |each| percent(each[0])),
        );
        row.push(
            bolt.strength_use
                .map_or_else(|| "–".to_owned(), |each| percent(each[1])),
        );
        row.push(optional(bolt.largest_torque.map(|most| most / torque.size)));
        rows.push(row);
    }
    let right = Side::Right;
    let [assembly, service] =
        ["assembly", "service"].map(|when| format!("{when} {}\nnominal", force.name));
    let most = format!("torque {}\nat most", torque.name);
    let mut text = aligned(
        &[
            ("clamp force\nper bolt", Side::Left),
            ("\nleast", right),
            (&assembly, right),
            ("\nmost", right),
            ("\nleast", right),
            (&service, right),
            ("\nmost", right),
            ("of yield\nnominal", right),
            ("\nhighest", right),
            (&most, right),
        ],
        &rows,
    );
    text.push_str(&axial::loads(case, units));
    text.push_str(&pressure::field(case, detail));
    text
}

/// Bolts that share force, strength use and largest torque, with their numbers in file order.
fn groups(bolts: &[BoltResult]) -> Vec<(String, Vec<&BoltResult>)> {
    let like = |one: &BoltResult, other: &BoltResult| {
        one.missing == other.missing
            && one.force == other.force
            && one.force_in_service == other.force_in_service
            && one.strength_use == other.strength_use
            && one.axial == other.axial
            && one.largest_torque == other.largest_torque
    };
    let mut runs: Vec<(usize, Vec<&BoltResult>)> = Vec::new();
    for (index, bolt) in bolts.iter().enumerate() {
        match runs.last_mut() {
            Some((_, run)) if like(run[0], bolt) => run.push(bolt),
            _ => runs.push((index, vec![bolt])),
        }
    }
    runs.into_iter()
        .map(|(first, run)| {
            let name = match run.len() {
                1 => format!("bolt {}", first + 1),
                count => format!("bolts {} to {}", first + 1, first + count),
            };
            (name, run)
        })
        .collect()
}

/// Cautions, most grave first, each with its code for `explain`. The grave ones are always told
/// in full; the others are cut to a line, or to their codes where brevity is asked for.
pub fn cautions(cautions: &[Caution], detail: Detail) -> String {
    if cautions.is_empty() {
        return String::new();
    }
    let mut text = format!(
        "cautions ({}), grave first; ringsum explain CODE tells what to do\n",
        cautions.len()
    );
    let of = |wanted: &[Gravity]| -> Vec<&Caution> {
        cautions
            .iter()
            .filter(|caution| wanted.contains(&gravity(caution.code)))
            .collect()
    };
    let grave = of(&[Gravity::Grave]);
    let others = of(&[Gravity::Range, Gravity::Note]);
    let standing = of(&[Gravity::Standing]);
    let line = |caution: &Caution| format!("{}: {}", caution.code, plain(&caution.text));
    let whole = |caution: &Caution| wrapped(&line(caution), WIDTH - 2, 2).replace('\n', "\n  ");
    for caution in grave {
        let _ = writeln!(text, "  {}", whole(caution));
    }
    match detail {
        Detail::Full => {
            for caution in others.into_iter().chain(standing) {
                let _ = writeln!(text, "  {}", whole(caution));
            }
            return text;
        }
        Detail::Screen => {
            for caution in others {
                let _ = writeln!(text, "  {}", cut(&line(caution), WIDTH - 2));
            }
        }
        Detail::Brief => {
            let codes: Vec<&str> = others.iter().map(|caution| caution.code).collect();
            if !codes.is_empty() {
                let told = wrapped(&codes.join(", "), WIDTH - 2, 0).replace('\n', "\n  ");
                let _ = writeln!(text, "  {told}");
            }
        }
    }
    text.push_str(&always(&standing));
    text
}

/// The duties of care that go with every result, in one sentence.
fn always(standing: &[&Caution]) -> String {
    let mut codes: Vec<&str> = standing.iter().map(|caution| caution.code).collect();
    codes.sort_unstable();
    codes.dedup();
    let told: Vec<String> = codes
        .into_iter()
        .filter_map(entry)
        .map(|entry| format!("{} ({})", entry.title, entry.code))
        .collect();
    if told.is_empty() {
        return String::new();
    }
    let line = format!("with every estimate: {}", told.join("; "));
    format!("  {}\n", wrapped(&line, WIDTH - 2, 2).replace('\n', "\n  "))
}

/// Assumptions: counted, with their values, or with their values and reasons.
fn assumptions(assumptions: &[Assumption], detail: Detail) -> String {
    let count = assumptions.len();
    if count == 0 {
        return String::new();
    }
    let stated = |each: &Assumption| format!("{} = {}", plain(&each.field), plain(&each.value));
    match detail {
        Detail::Brief => format!("assumptions: {count}, listed without --brief\n"),
        Detail::Screen => {
            let all: Vec<String> = assumptions.iter().map(stated).collect();
            let told = wrapped(&all.join("; "), WIDTH - 2, 0).replace('\n', "\n  ");
            format!(
                "assumptions ({count}), to be replaced in the file; --full tells why\n  {told}\n"
            )
        }
        Detail::Full => {
            let mut text = format!("assumptions ({count}), to be replaced in the file\n");
            for each in assumptions {
                let line = format!("{}: {}", stated(each), plain(&each.why));
                let told = wrapped(&line, WIDTH - 2, 2).replace('\n', "\n  ");
                let _ = writeln!(text, "  {told}");
            }
            text
        }
    }
}

/// The report with colour for a terminal: headings bold, verdicts in green, yellow and red.
///
/// The words stay the same, so nothing is lost where colour is stripped.
pub fn painted(report: &str) -> String {
    let bold = Style::new().bold();
    let verdicts = [
        ("NOT MET", AnsiColor::Red),
        ("UNCERTAIN", AnsiColor::Yellow),
        (": MET", AnsiColor::Green),
    ];
    let mut text = String::new();
    let mut opens = true;
    for line in report.lines() {
        let verdict = verdicts
            .iter()
            .find(|(word, _)| line.starts_with("requirement") && line.contains(word));
        if let Some((word, color)) = verdict {
            let style = color.on_default().bold();
            let marked = line.replacen(word, &format!("{style}{word}{style:#}"), 1);
            let _ = writeln!(text, "{marked}");
        } else if opens {
            let _ = writeln!(text, "{bold}{line}{bold:#}");
        } else {
            let _ = writeln!(text, "{line}");
        }
        opens = line.is_empty();
    }
    text
}
