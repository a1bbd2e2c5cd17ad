//! The layouts of a search, for the terminal and as JSON.

mod json;

pub(super) use json::ArrangeResult;
pub use json::json;

use std::fmt::Write;

use crate::{
    joint::Limit,
    layout::{Answer, Defaults, Goal, Row, Verdict},
    report::{
        number::{brief, four, optional, plain, wrapped},
        table::{Side, aligned},
        text::told_in,
    },
    units::{Shown, System},
};

/// Widest line of a list of places.
const WIDTH: usize = 96;

/// What a pattern is called.
pub fn pattern(row: &Row) -> String {
    if row.refined {
        "free, moved".to_owned()
    } else {
        row.family.name().to_owned()
    }
}

/// The verdict in a word.
pub fn verdict(row: &Row) -> &'static str {
    match row.verdict {
        Verdict::Met => "yes",
        Verdict::ByForce => "by force",
        Verdict::AtNominal => "nominal only",
        Verdict::NotMet => "no",
        Verdict::Screened => "not solved",
        Verdict::Failed(_) => "failed",
    }
}

/// The search as a table with the answer under it.
pub fn answer(answer: &Answer, defaults: &Defaults) -> String {
    answer_in(answer, defaults, System::Si)
}

/// The search in a system of units.
pub fn answer_in(answer: &Answer, defaults: &Defaults, units: System) -> String {
    let title = plain(&answer.title);
    let mut text = format!("{}\n", question(answer));
    let solved = answer.rows.iter().filter(|row| row.solution.is_some());
    let _ = writeln!(
        text,
        "{} layouts by rule and the free places screened; {} solved, field elastic, fast",
        answer.rules,
        solved.count()
    );
    if !answer.complete {
        text.push_str("interrupted: this is the best so far\n");
    }
    text.push('\n');
    text.push_str(&table(answer, units));
    text.push_str(
        "\nK/W: the quantity asked for; least, largest: at those forces of all bolts together\n\
         *: no layout shown costs less and is as good; its low and high are 5 % and 95 % of drawn joints,\n\
         and `meets` is judged at the worse of them; elsewhere at nominal and both forces (by force)\n",
    );
    text.push_str(&best(answer, units));
    for row in &answer.rows {
        if let Verdict::Failed(failure) = &row.verdict {
            let line = format!("{} {}: {failure}", row.places.len(), row.label);
            let _ = writeln!(text, "failed   {}", wrapped(&plain(&line), WIDTH - 9, 9));
        }
    }
    for (key, value) in &defaults.taken {
        let _ = writeln!(text, "assumed  {key}: {value} (not stated)");
    }
    if !answer.fixed.is_empty() {
        let line = format!(
            "not arranged, and counted as they stand: {}",
            plain(&answer.fixed.join("; "))
        );
        let _ = writeln!(text, "note     {}", wrapped(&line, WIDTH - 9, 9));
    }
    let over: Vec<String> = answer
        .rows
        .iter()
        .filter(|row| row.front && row.over_heat > 0)
        .map(|row| {
            let [over, all] = [row.over_heat, row.places.len()];
            format!("{over} of {all} {}, {}", plain(&row.label), pattern(row))
        })
        .collect();
    if !over.is_empty() {
        let line = format!(
            "heads reach over a heated zone ({}); where a part stands there, state it under \
             arrange.keep_out",
            over.join("; ")
        );
        let _ = writeln!(text, "note     {}", wrapped(&line, WIDTH - 9, 9));
    }
    if !answer.passed_over.is_empty() {
        let _ = writeln!(
            text,
            "note     screening passes over {}; the solved rows do not",
            plain(&answer.passed_over.join(", "))
        );
    }
    format!("{title}\n{}", told_in(&text, units))
}

/// What was asked, in a line.
fn question(answer: &Answer) -> String {
    let wanted = match answer.goal {
        Goal::Bolts => "fewest bolts",
        Goal::Mass => "least fastener mass",
        Goal::Resistance => "lowest resistance",
    };
    let measure = answer.target.measure.name();
    let required = match answer.target.limit {
        None => measure.to_owned(),
        Some((limit, bound)) => {
            let side = match bound {
                Limit::Most => "at most",
                Limit::Least => "at least",
            };
            let rise = answer.heat.map_or_else(String::new, |heat| {
                format!(" ({} K at {} W)", brief(limit * heat), brief(heat))
            });
            format!("{measure} {side} {} K/W{rise}", four(limit))
        }
    };
    let cases = match answer.cases.as_slice() {
        [only] => format!("{only} case"),
        several => format!(
            "the worst of {}; screened in the {} case",
            several.join(" and "),
            answer.screened_case
        ),
    };
    format!("{wanted}: {required}; {cases}")
}

fn table(answer: &Answer, units: System) -> String {
    let [lever, mass] = [Shown::Torque, Shown::SmallMass].map(|shown| units.unit(shown));
    let torque = format!("torque\n{}", lever.name);
    let weight = format!("mass\n{}", mass.name);
    let rows: Vec<Vec<String>> = answer
        .rows
        .iter()
        .map(|row| {
            let [nominal, least, largest] = row.solution.as_ref().map_or([None; 3], |solution| {
                solution.cases[row.case].values().map(Some)
            });
            let [low, high] = row
                .band
                .as_ref()
                .map_or([None; 2], |band| band[row.case].map(Some));
            let case = match (answer.cases.as_slice(), &row.solution) {
                ([_, _, ..], Some(_)) => format!(", {}", answer.cases[row.case]),
                _ => String::new(),
            };
            vec![
                if row.front { "*" } else { "" }.to_owned(),
                row.places.len().to_string(),
                plain(&row.label),
                row.torque
                    .map_or_else(|| "–".to_owned(), |torque| brief(torque / lever.size)),
                pattern(row),
                four(row.mass / mass.size),
                optional(nominal),
                optional(least),
                optional(largest),
                optional(low),
                optional(high),
                format!("{}{case}", verdict(row)),
            ]
        })
        .collect();
    let (left, right) = (Side::Left, Side::Right);
    aligned(
        &[
            ("", left),
            ("bolts", right),
            ("fastener", left),
            (&torque, right),
            ("pattern", left),
            (&weight, right),
            ("K/W\nnominal", right),
            ("K/W\nleast", right),
            ("K/W\nlargest", right),
            ("K/W\nlow", right),
            ("K/W\nhigh", right),
            (
                if answer.cases.len() > 1 {
                    "meets, worst case"
                } else {
                    "meets"
                },
                left,
            ),
        ],
        &rows,
    )
}

/// The row that answers, with its places.
fn best(answer: &Answer, units: System) -> String {
    let length = units.unit(Shown::Length);
    let Some(row) = answer.best.and_then(|best| answer.rows.get(best)) else {
        return if answer.complete {
            "best     none: no solved layout meets the requirement at the unfavourable end of its band\n"
                .to_owned()
        } else {
            String::new()
        };
    };
    let places: Vec<String> = row
        .places
        .iter()
        .map(|[x, y]| format!("({}, {})", place(*x / length.size), place(*y / length.size)))
        .collect();
    let line = format!(
        "{} {}, {}: {} K/W; places in {} {}",
        row.places.len(),
        plain(&row.label),
        pattern(row),
        four(row.value()),
        length.name,
        places.join(" ")
    );
    format!("best     {}\n", wrapped(&line, WIDTH - 9, 9))
}

/// A length of a layout, to a thousandth of its unit.
fn place(length: f64) -> String {
    let text = format!("{length:.3}");
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}
