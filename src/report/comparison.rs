//! Joints side by side as text: results, what else counts, and whether the choice matters.

use crate::{
    diagnostic::registry::{Gravity, gravity},
    estimate::{CaseResult, Met},
    report::{
        number::{band, brief, cut, four, optional, percent, plain, wrapped},
        table::{Side, aligned},
        text::{WIDTH, told_around},
    },
    uncertainty::{Compared, Comparison, Sense, Verdict},
    units::{Shown, System},
};
use std::fmt::Write;

/// Widest name in a table, characters.
const NAME: usize = 26;

/// The comparison on a screen.
pub fn comparison(found: &Comparison) -> String {
    comparison_in(found, System::Si)
}

/// The comparison in a system of units.
pub fn comparison_in(found: &Comparison, units: System) -> String {
    let parts = [
        heading(found),
        results(found),
        extras(found, units),
        verdicts(found),
        notes(found),
    ];
    let whole = found.joints.iter().map(|joint| plain(&joint.name));
    let names: Vec<String> = found.joints.iter().map(name).chain(whole).collect();
    told_around(&parts.join("\n"), (units, &names))
}

impl Compared {
    /// The case that is compared.
    pub(super) fn worst(&self) -> Option<&CaseResult> {
        self.estimate.cases.get(self.case)
    }
}

fn name(joint: &Compared) -> String {
    cut(&plain(&joint.name), NAME)
}

fn heading(found: &Comparison) -> String {
    let Some(first) = found.joints.first() else {
        return String::new();
    };
    let estimate = &first.estimate;
    let drawn = match estimate.draws {
        0 => "nominal only".to_owned(),
        draws => format!(
            "low and high: 5 % and 95 % of {draws} draws, seed {}",
            estimate.seed
        ),
    };
    format!(
        "{} joints, field {}, {}; {drawn}\n",
        found.joints.len(),
        estimate.field,
        estimate.resolution
    )
}

/// The four results with their bands, K/W.
fn results(found: &Comparison) -> String {
    let right = Side::Right;
    let table = |names: [&str; 2], of: &dyn Fn(&CaseResult) -> [String; 6]| {
        let rows: Vec<Vec<String>> = found
            .joints
            .iter()
            .filter_map(|joint| {
                let mut row = vec![name(joint)];
                row.extend(of(joint.worst()?));
                Some(row)
            })
            .collect();
        let [first, second] = names.map(|name| format!("{name}\nnominal"));
        aligned(
            &[
                ("K/W", Side::Left),
                ("\nlow", right),
                (&first, right),
                ("\nhigh", right),
                ("\nlow", right),
                (&second, right),
                ("\nhigh", right),
            ],
            &rows,
        )
    };
    let pair = |one: [String; 3], other: [String; 3]| {
        let [a, b, c] = one;
        let [d, e, f] = other;
        [a, b, c, d, e, f]
    };
    let whole = table(["source to sink", "added by joint"], &|case| {
        let results = &case.results;
        pair(
            band(&results.source_to_sink.resistance, 1.0),
            band(&results.added_by_joint.resistance, 1.0),
        )
    });
    let parts = table(["contact only", "node to node"], &|case| {
        let results = &case.results;
        pair(
            band(&results.contact.resistance, 1.0),
            band(&results.node_to_node.resistance, 1.0),
        )
    });
    format!("{whole}\n{parts}")
}

/// A column that is left out where no joint has a value.
type Column<'a> = (&'a str, Box<dyn Fn(&Compared) -> Option<String>>);

/// Rise, requirement, strength, mass, bolts, cost and the worst loss.
fn extras(found: &Comparison, units: System) -> String {
    let [small, large] = [Shown::SmallMass, Shown::Mass].map(|shown| units.unit(shown));
    let fasteners = format!("fasteners\n{}", small.name);
    let all = format!("all\n{}", large.name);
    let columns: [Column; 11] = [
        (
            "rise K\nnominal",
            Box::new(|joint| Some(four(joint.worst()?.rise?.source.nominal))),
        ),
        (
            "rise K\nhigh",
            Box::new(|joint| joint.worst()?.rise?.source.high.map(four)),
        ),
        ("required", Box::new(requirement)),
        (
            "of yield\nhighest",
            Box::new(|joint| strength(joint).map(percent)),
        ),
        ("bolts", Box::new(|joint| Some(joint.bolts.to_string()))),
        (
            &fasteners,
            Box::new(move |joint| Some(four(joint.mass.fasteners / small.size))),
        ),
        (
            &all,
            Box::new(move |joint| Some(four(joint.mass.total() / large.size))),
        ),
        ("cost", Box::new(|joint| joint.cost.map(brief))),
        (
            "lost\nbolt",
            Box::new(|joint| Some(joint.loss.as_ref()?.bolt.to_string())),
        ),
        (
            "then K/W\nnominal",
            Box::new(|joint| joint.loss.as_ref().map(|_| optional(lost(joint)))),
        ),
        (
            "then\nworse",
            Box::new(|joint| Some(percent(joint.loss.as_ref()?.growth? - 1.0))),
        ),
    ];
    let told: Vec<&Column> = columns
        .iter()
        .filter(|(_, cell)| found.joints.iter().any(|joint| cell(joint).is_some()))
        .collect();
    let rows: Vec<Vec<String>> = found
        .joints
        .iter()
        .map(|joint| {
            let mut row = vec![name(joint)];
            let cells = told.iter().map(|(_, cell)| cell(joint));
            row.extend(cells.map(|cell| cell.unwrap_or_else(|| "–".to_owned())));
            row
        })
        .collect();
    let mut headings = vec![("", Side::Left)];
    headings.extend(told.iter().map(|(heading, _)| (*heading, Side::Right)));
    aligned(&headings, &rows)
}

fn requirement(joint: &Compared) -> Option<String> {
    let (_, result) = joint.estimate.requirement()?;
    Some(
        match result.met {
            // Told below the table.
            Met::Yes if joint.estimate.met_of_heat_alone().is_some() => "met*",
            Met::Uncertain if joint.estimate.met_of_heat_alone().is_some() => "uncertain*",
            Met::Yes => "met",
            Met::Uncertain => "uncertain",
            Met::No => "NOT MET",
        }
        .to_owned(),
    )
}

/// Highest equivalent stress over yield of any bolt.
pub(super) fn strength(joint: &Compared) -> Option<f64> {
    let uses = joint
        .worst()?
        .bolts
        .iter()
        .filter_map(|bolt| bolt.strength_use);
    uses.map(|[_, highest]| highest).reduce(f64::max)
}

/// Source to sink after the worst loss, K/W.
pub(super) fn lost(joint: &Compared) -> Option<f64> {
    let nominal = joint.worst()?.results.source_to_sink.resistance.nominal;
    Some(nominal * joint.loss.as_ref()?.growth?)
}

fn verdicts(found: &Comparison) -> String {
    let Some(best) = found.joints.get(found.best) else {
        return String::new();
    };
    let what = match found.sense {
        Sense::Pass => "least",
        Sense::Resist => "largest",
    };
    let mut text = format!(
        "best     {}: {what} source to sink at nominal\n",
        plain(&best.name)
    );
    if let Some(why) = best.estimate.met_of_heat_alone() {
        let _ = writeln!(text, "         of heat alone: {why}");
    }
    for joint in &found.joints {
        if let Some(verdict) = joint.verdict {
            let line = format!("against  {}", sentence(joint, best, verdict));
            let body = wrapped(line.trim_start_matches("against  "), WIDTH - 9, 0);
            let _ = writeln!(text, "against  {}", body.replace('\n', "\n         "));
        }
    }
    text
}

fn sentence(joint: &Compared, best: &Compared, verdict: Verdict) -> String {
    let of = |joint: &Compared| {
        joint.worst().map_or(f64::NAN, |case| {
            case.results.source_to_sink.resistance.nominal
        })
    };
    let ratio = of(joint) / of(best);
    let ratio = ratio.max(ratio.recip());
    let apart = if ratio > 2.0 {
        format!("a factor of {}", four(ratio))
    } else {
        percent(ratio - 1.0)
    };
    let odds = joint.odds.map_or_else(String::new, |odds| {
        format!("better in {:.0} of 100 drawn pairs, ", 100.0 * odds)
    });
    let name = plain(&joint.name);
    match verdict {
        Verdict::Surely => format!("{name}: {odds}by {apart} at nominal: surely better"),
        Verdict::Likely => format!("{name}: {odds}by {apart} at nominal: likely better"),
        Verdict::Even => {
            format!(
                "{name}: {odds}by {apart} at nominal: the choice does not matter, scatter hides it"
            )
        }
        Verdict::WithinError => {
            let error = joint.worst().map_or(f64::NAN, |case| case.numerical_error);
            format!(
                "{name}: {odds}by {apart} at nominal, within the numerical error of {}: the choice does not matter",
                percent(error)
            )
        }
        Verdict::AtNominal => {
            format!("{name}: by {apart} at nominal; without draws nobody knows how surely")
        }
    }
}

/// What the numbers stand on, and the cautions of each joint by their codes.
fn notes(found: &Comparison) -> String {
    let mut text = String::new();
    let mut tell = |line: &str| {
        let _ = writeln!(text, "{}", wrapped(line, WIDTH, 2));
    };
    if found.joints.iter().any(|joint| joint.odds.is_some()) {
        tell(
            "drawn pairs: an input of the same name lies at the same quantile in both (same lot, same tool); \
             inputs that only one has are independent",
        );
    }
    for joint in &found.joints {
        let starred = requirement(joint).is_some_and(|word| word.ends_with('*'));
        if let Some(why) = joint.estimate.met_of_heat_alone().filter(|_| starred) {
            tell(&format!("* {}: of heat alone: {why}", plain(&joint.name)));
        }
    }
    let losses: Vec<&Compared> = found
        .joints
        .iter()
        .filter(|joint| joint.loss.is_some())
        .collect();
    if let Some(loss) = losses.first().and_then(|joint| joint.loss.as_ref()) {
        let level = match found.joints[0].estimate.field {
            "cone" => String::new(),
            _ => format!(", by the growth on the {} level", loss.resolution),
        };
        tell(&format!(
            "lost bolt: the single loss that costs most, at nominal{level}; its hole stays, of like bolts one is solved"
        ));
    }
    for joint in &losses {
        if let Some(failure) = joint.loss.as_ref().and_then(|loss| loss.failure.as_ref()) {
            tell(&format!(
                "{} without that bolt: {failure}",
                plain(&joint.name)
            ));
        }
    }
    tell(
        "mass: bolts, nuts and washers of the catalogue (within about 10 %), and plates with their density",
    );
    for joint in found
        .joints
        .iter()
        .filter(|joint| !joint.mass.left_out.is_empty())
    {
        tell(&format!(
            "not in the mass of {}: {}",
            plain(&joint.name),
            plain(&joint.mass.left_out.join("; "))
        ));
    }
    let resist = found.sense == Sense::Resist;
    let other: Vec<String> = found
        .joints
        .iter()
        .filter(|joint| {
            let asked = joint.estimate.requirement();
            asked.is_some_and(|(_, result)| result.resists() != resist)
        })
        .map(|joint| plain(&joint.name))
        .collect();
    if !other.is_empty() {
        tell(&format!(
            "best is the joint that resists most, as one of them must; the requirement of {} asks for the opposite",
            other.join(", ")
        ));
    }
    let first = found.joints.first().map(|joint| joint.estimate.heat);
    if found
        .joints
        .iter()
        .any(|joint| Some(joint.estimate.heat) != first)
    {
        tell("the joints state different heat: rises belong to each joint's own");
    }
    for joint in &found.joints {
        if joint.estimate.cases.len() > 1 {
            let case = joint.worst().map_or("", |case| case.name);
            tell(&format!(
                "{}: {case} case, the one it stands worst in",
                plain(&joint.name)
            ));
        }
        let mut codes: Vec<&str> = joint
            .estimate
            .cautions
            .iter()
            .map(|caution| caution.code)
            .filter(|code| gravity(code) == Gravity::Grave)
            .collect();
        codes.dedup();
        if !codes.is_empty() {
            tell(&format!(
                "{}: grave cautions: {}",
                plain(&joint.name),
                codes.join(", ")
            ));
        }
    }
    text
}
