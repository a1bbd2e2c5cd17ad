//! The layouts of a search, for the terminal and as JSON.

use std::fmt::Write;

use serde_json::{Value, json};

use crate::{
    joint::Limit,
    layout::{Answer, Defaults, Goal, Row, Verdict},
    report::{
        number::{brief, four, optional, plain, wrapped},
        table::{Side, aligned},
    },
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
        Verdict::AtNominal => "nominal only",
        Verdict::NotMet => "no",
        Verdict::Screened => "not solved",
        Verdict::Failed(_) => "failed",
    }
}

/// The search as a table with the answer under it.
pub fn answer(answer: &Answer, defaults: &Defaults) -> String {
    let mut text = format!("{}\n{}\n", plain(&answer.title), question(answer));
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
    text.push_str(&table(answer));
    text.push_str(
        "\nK/W: the quantity asked for; least and largest: at those forces of all bolts together\n\
         *: no layout shown costs less and is as good\n",
    );
    text.push_str(&best(answer));
    for row in &answer.rows {
        if let Verdict::Failed(failure) = &row.verdict {
            let line = format!("{} {}: {failure}", row.places.len(), row.label);
            let _ = writeln!(text, "failed   {}", wrapped(&plain(&line), WIDTH - 9, 9));
        }
    }
    for (key, value) in &defaults.taken {
        let _ = writeln!(text, "assumed  {key}: {value} (not stated)");
    }
    if !answer.passed_over.is_empty() {
        let _ = writeln!(
            text,
            "note     screening passes over {}; the solved rows do not",
            plain(&answer.passed_over.join(", "))
        );
    }
    text
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
    format!("{wanted}: {required}; {} case", answer.case)
}

fn table(answer: &Answer) -> String {
    let rows: Vec<Vec<String>> = answer
        .rows
        .iter()
        .map(|row| {
            let [nominal, least, largest] = row
                .solution
                .as_ref()
                .map_or([None; 3], |solution| solution.values().map(Some));
            vec![
                if row.front { "*" } else { "" }.to_owned(),
                row.places.len().to_string(),
                plain(&row.label),
                row.torque.map_or_else(|| "–".to_owned(), brief),
                pattern(row),
                four(1e3 * row.mass),
                four(row.screened),
                optional(nominal),
                optional(least),
                optional(largest),
                verdict(row).to_owned(),
            ]
        })
        .collect();
    let (left, right) = (Side::Left, Side::Right);
    aligned(
        &[
            ("", left),
            ("bolts", right),
            ("fastener", left),
            ("torque\nN·m", right),
            ("pattern", left),
            ("mass\ng", right),
            ("K/W\nscreened", right),
            ("K/W\nnominal", right),
            ("K/W\nleast", right),
            ("K/W\nlargest", right),
            ("meets", left),
        ],
        &rows,
    )
}

/// The row that answers, with its places.
fn best(answer: &Answer) -> String {
    let Some(row) = answer.best.and_then(|best| answer.rows.get(best)) else {
        return if answer.complete {
            "best     none: no solved layout meets the requirement from the least to the largest force\n"
                .to_owned()
        } else {
            String::new()
        };
    };
    let places: Vec<String> = row
        .places
        .iter()
        .map(|[x, y]| format!("({}, {})", millimetres(*x), millimetres(*y)))
        .collect();
    let line = format!(
        "{} {}, {}: {} K/W; places in mm {}",
        row.places.len(),
        plain(&row.label),
        pattern(row),
        four(row.value()),
        places.join(" ")
    );
    format!("best     {}\n", wrapped(&line, WIDTH - 9, 9))
}

/// A length of a layout in mm, whole micrometres.
fn millimetres(metres: f64) -> String {
    let text = format!("{:.3}", 1e3 * metres);
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

/// The search as JSON, SI.
pub fn json(answer: &Answer, defaults: &Defaults) -> Value {
    let rows: Vec<Value> = answer.rows.iter().map(row).collect();
    let assumed = defaults.taken.iter();
    json!({
        "ringsum": env!("CARGO_PKG_VERSION"),
        "title": answer.title,
        "case": answer.case,
        "goal": answer.goal.name(),
        "quantity": answer.target.measure.name(),
        "limit": answer.target.limit.map(|(limit, bound)| json!({
            "resistance": limit,
            "bound": match bound { Limit::Most => "most", Limit::Least => "least" },
        })),
        "complete": answer.complete,
        "layouts_by_rule": answer.rules,
        "rows": rows,
        "best": answer.best,
        "passed_over": answer.passed_over,
        "assumptions": assumed
            .map(|(key, value)| json!({ "field": format!("arrange.{key}"), "value": value }))
            .collect::<Vec<Value>>(),
    })
}

fn row(row: &Row) -> Value {
    json!({
        "bolts": row.places.len(),
        "fastener": row.label,
        "size": row.size.map(|size| size + 1),
        "torque": row.torque,
        "pattern": row.family.name(),
        "moved": row.refined,
        "mass": row.mass,
        "at": row.places,
        "screened": row.screened,
        "resistance": row.solution.as_ref().map(|solution| json!({
            "source_to_sink": solution.source_to_sink,
            "nominal": solution.nominal,
            "least_force": solution.least_force,
            "largest_force": solution.largest_force,
        })),
        "meets": verdict(row),
        "failure": match &row.verdict { Verdict::Failed(failure) => Some(failure), _ => None },
        "front": row.front,
    })
}
