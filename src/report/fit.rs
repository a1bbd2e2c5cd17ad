//! Fits of own measurements, as text and as JSON.

mod json;

pub(super) use json::{SeriesResult, UnknownResult};
pub use json::{answer_json, series_json};

use crate::{
    fit::{
        Abscissa, Branch, Hysteresis, Ordinate, PowerLaw, Series, Shape,
        profile::Verdict,
        unknown::{Answer, Question, moved},
    },
    report::{
        number::{four, plain, wrapped},
        table::{Side, aligned},
        text::{self, Detail},
    },
    units::{Quantity, Shown, System, show},
};
use std::fmt::Write;

/// Rows of the table of a law.
const ROWS: usize = 5;

/// Width of the lines, characters.
const WIDTH: usize = 96;

/// The unit in which a quantity stands in tables and figures, and its size in SI.
pub fn unit(quantity: Quantity, units: System) -> (&'static str, f64) {
    let shown = match quantity {
        Quantity::Pressure => Shown::Pressure,
        Quantity::Force => Shown::Force,
        Quantity::Torque => Shown::Torque,
        Quantity::FilmCoefficient => Shown::Conductance,
        other => return (other.unit(), 1.0),
    };
    let unit = units.unit(shown);
    (unit.name, unit.size)
}

/// What was fitted, as people say it.
pub fn fitted(ordinate: Ordinate) -> &'static str {
    if ordinate.is_per_area() { "h" } else { "G" }
}

/// What was fitted, in words.
pub fn measured(ordinate: Ordinate) -> &'static str {
    if ordinate.is_per_area() {
        "contact conductance"
    } else {
        "conductance"
    }
}

/// The sign of what was varied.
fn sign(abscissa: Abscissa) -> &'static str {
    match abscissa {
        Abscissa::Pressure => "p",
        Abscissa::Force => "F",
        Abscissa::Torque => "T",
    }
}

/// A fitted series for the terminal in SI; the block is printed apart.
pub fn series(series: &Series, name: &str) -> String {
    series_in(series, name, System::Si)
}

/// The same in a system of units.
pub fn series_in(series: &Series, name: &str, units: System) -> String {
    let mut text = format!(
        "{}: {} against {}\n",
        plain(name),
        measured(series.ordinate),
        series.abscissa.name()
    );
    for branch in &series.branches {
        text.push('\n');
        text.push_str(&self::branch((series, units), branch));
    }
    if let Some(found) = series.hysteresis {
        let _ = writeln!(
            text,
            "\n{}",
            units.restated(&hysteresis(&found, series.abscissa))
        );
    }
    let told = text::cautions(&series.cautions, Detail::Full);
    if !told.is_empty() {
        let _ = write!(text, "\n{}", units.restated(&told));
    }
    text
}

fn hysteresis(found: &Hysteresis, abscissa: Abscissa) -> String {
    let between = found.interval.map_or_else(String::new, |[low, high]| {
        format!(" ({} to {}, 90 %)", four(low), four(high))
    });
    format!(
        "unloading over loading at {}: {}{between}",
        show(found.at, abscissa.quantity()),
        four(found.ratio)
    )
}

fn branch((series, units): (&Series, System), branch: &Branch) -> String {
    let [low, high] = branch.range();
    let x = |value: f64| units.restated(&show(value, series.abscissa.quantity()));
    let named = branch.direction.map_or("all", |way| way.name());
    let mut text = format!(
        "{named}: {} readings from {} to {}\n",
        branch.readings.len(),
        x(low),
        x(high)
    );
    match &branch.shape {
        Shape::Law(law) => text.push_str(&self::law((series, units), law)),
        Shape::Table(table) => {
            let (x_unit, x_size) = unit(series.abscissa.quantity(), units);
            let (y_unit, y_size) = unit(series.ordinate.fitted(), units);
            let rows: Vec<Vec<String>> = table
                .rows
                .iter()
                .map(|(x, y)| vec![four(x / x_size), four(y / y_size)])
                .collect();
            text.push_str(&aligned(
                &[
                    (
                        &format!("{}\n{x_unit}", series.abscissa.name()),
                        Side::Right,
                    ),
                    (&format!("table\n{y_unit}"), Side::Right),
                ],
                &rows,
            ));
            let _ = writeln!(
                text,
                "scatter factor {} (one standard deviation)",
                four(table.factor())
            );
        }
    }
    text
}

fn law((series, units): (&Series, System), law: &PowerLaw) -> String {
    let quantity = series.ordinate.fitted();
    let (y_unit, y_size) = unit(quantity, units);
    let between = |low: f64, high: f64| format!("({} to {}, 90 %)", four(low), four(high));
    let slope = law.reach * law.covariance[1][1].sqrt();
    let [low, high] = law.band(law.reference);
    let mut text = format!(
        "  {} = {} ({} / {})^{:.3}\n",
        fitted(series.ordinate),
        units.restated(&show(law.coefficient, quantity)),
        sign(series.abscissa),
        units.restated(&show(law.reference, series.abscissa.quantity())),
        law.exponent,
    );
    let _ = writeln!(
        text,
        "  exponent        {} {}\n  coefficient     {} {} {}\n  scatter factor  {} (one standard deviation; one reading about the law {})",
        four(law.exponent),
        between(law.exponent - slope, law.exponent + slope),
        four(law.coefficient / y_size),
        y_unit,
        between(low / y_size, high / y_size),
        four(law.factor()),
        four(law.scatter.exp()),
    );
    match law.agreement {
        Some(agreement) => {
            let word = if agreement.too_small() {
                "sigma is stated too small"
            } else if agreement.too_large() {
                "sigma is stated too large"
            } else {
                "sigma agrees with the residuals"
            };
            let _ = writeln!(
                text,
                "  chi squared     {} on {} degrees of freedom, {} each: {word}",
                four(agreement.chi_squared),
                law.degrees,
                four(agreement.reduced),
            );
        }
        None => {
            let _ = writeln!(
                text,
                "  sigma not stated: scatter from the residuals, {} degrees of freedom, Student's t",
                law.degrees
            );
        }
    }
    text.push_str(&bands((series, units), law));
    text
}

/// The law over its range with both bands.
fn bands((series, units): (&Series, System), law: &PowerLaw) -> String {
    let (x_unit, x_size) = unit(series.abscissa.quantity(), units);
    let (y_unit, y_size) = unit(series.ordinate.fitted(), units);
    let [from, to] = law.range;
    let rows: Vec<Vec<String>> = (0..ROWS)
        .map(|row| from * (to / from).powf(row as f64 / (ROWS - 1) as f64))
        .map(|x| {
            let ([low, high], [least, most]) = (law.band(x), law.prediction(x));
            let values = [low, law.at(x), high, least, most].map(|value| four(value / y_size));
            let mut cells = vec![four(x / x_size)];
            cells.extend(values);
            cells
        })
        .collect();
    let y = format!("{} {y_unit}", fitted(series.ordinate));
    let right = Side::Right;
    aligned(
        &[
            (&format!("{}\n{x_unit}", series.abscissa.name()), right),
            (&format!("{y}\n5 %"), right),
            ("\nlaw", right),
            ("\n95 %", right),
            ("another reading\n5 %", right),
            ("\n95 %", right),
        ],
        &rows,
    )
}

/// A fitted unknown for the terminal.
pub fn answer(asked: &Question, answer: &Answer, name: &str) -> String {
    answer_in(asked, answer, (name, System::Si))
}

/// The same in a system of units; names and the override at the end stay as they are.
pub fn answer_in(asked: &Question, answer: &Answer, (name, units): (&str, System)) -> String {
    let shown = |share: f64| asked.unknown.shown(asked.range.at(share));
    let profile = &answer.profile;
    let percent = |ln: f64| format!("{:.1} %", 100.0 * ln.exp_m1());
    let [low, high] = profile.interval;
    let head = format!(
        "{}\n{}: {} reading{}, {}\n",
        plain(&answer.title),
        plain(name),
        answer.readings,
        if answer.readings == 1 { "" } else { "s" },
        plain(&answer.planes),
    );
    let mut text = format!(
        "field {}\nunknown: {}, sought from {} to {}\n\n",
        answer.field,
        plain(&asked.unknown.name()),
        shown(0.0),
        shown(1.0),
    );
    let open = |end: bool| if end { " (the end of the range)" } else { "" };
    let _ = writeln!(
        text,
        "likeliest    {}\n90 % from    {}{}\n     to      {}{}",
        shown(profile.best),
        shown(low),
        open(matches!(
            profile.verdict,
            Verdict::AboveOnly | Verdict::Undetermined
        )),
        shown(high),
        open(matches!(
            profile.verdict,
            Verdict::BelowOnly | Verdict::Undetermined
        )),
    );
    let _ = writeln!(
        text,
        "\nover the range the model moves {}; readings leave {} open, other inputs {}, together {}\n(one standard deviation; numerical error {} counted among the other inputs)",
        moved(profile.movement),
        percent(answer.measured),
        percent(answer.other),
        percent(answer.whole),
        percent(answer.numerical_error.ln_1p()),
    );
    if let Some(scatter) = answer.scatter {
        let _ = writeln!(
            text,
            "sigma not stated: one reading scatters by {}, found from them",
            percent(scatter)
        );
    }
    if let Some(chance) = profile.chance {
        let _ = writeln!(
            text,
            "chi squared {} for {} readings; chance of more {:.0} %",
            four(profile.chi_squared),
            answer.readings,
            100.0 * chance
        );
    }
    let _ = writeln!(
        text,
        "contact only is {:.1} % of the measured resistance at the likeliest value",
        100.0 * answer.contact_share
    );
    let inputs = if answer.inputs.is_empty() {
        "none: other inputs are taken as nominal".to_owned()
    } else {
        format!(
            "{}: integrated out by mean and covariance of drawn joints (marginal likelihood)",
            answer.inputs.join(", ")
        )
    };
    let _ = writeln!(
        text,
        "{}",
        wrapped(&format!("other inputs: {inputs}"), WIDTH, 2)
    );
    let _ = writeln!(
        text,
        "model solved at {} values; missed between them by {:.2} % at most",
        answer.nodes.len(),
        100.0 * answer.interpolation
    );
    let told = text::cautions(&answer.cautions, Detail::Full);
    if !told.is_empty() {
        let _ = write!(text, "\n{told}");
    }
    let mut text = head + &units.restated(&text);
    let sets = asked.unknown.sets(asked.range.at(profile.best));
    if profile.verdict == Verdict::Determined && !sets.is_empty() {
        text.push_str("\nthe likeliest joint:");
        for path in sets.iter().filter_map(|set| set.split_once('=')) {
            let _ = write!(text, " --set '{}={}'", path.0, shown(profile.best));
        }
        text.push('\n');
    }
    text
}
