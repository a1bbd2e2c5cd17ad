//! The torque window, for the terminal: limits as lines of the table, then a plain statement.

use crate::{
    estimate::{Judged, Range, Side, TorqueSweep, TorqueWindow},
    report::{
        number::{four, percent, plain, wrapped},
        text::WIDTH,
    },
    uncertainty::{FIRST, LAST, REQUIREMENT},
};

/// A line of the table that marks a torque.
pub(super) struct Mark {
    /// Torque, N m.
    pub torque: f64,
    /// What stands there.
    pub words: String,
}

/// Every torque worth a line of its own, rising.
pub(super) fn marks(sweep: &TorqueSweep) -> Vec<Mark> {
    let window = &sweep.window;
    let mut marks: Vec<Mark> = window
        .limits
        .iter()
        .map(|limit| Mark {
            torque: limit.torque,
            words: match limit.side {
                Side::Least => format!("{}: below it the faces may part", limit.name),
                Side::Most => limit.name.to_owned(),
            },
        })
        .collect();
    marks.extend(window.knee.map(|torque| Mark {
        torque,
        words: "knee: 90 % of what tightening can give".to_owned(),
    }));
    for range in window.heat.iter().flatten() {
        for (end, words) in [
            (range.low, "the requirement is met from here"),
            (range.high, "the requirement is met up to here"),
        ] {
            if end.by == REQUIREMENT {
                marks.push(Mark {
                    torque: end.torque,
                    words: words.to_owned(),
                });
            }
        }
    }
    marks.sort_by(|one, other| one.torque.total_cmp(&other.torque));
    marks
}

/// The rows of a table, each at its torque, with the marks between them.
pub(super) fn interleaved(table: &str, torques: &[f64], marks: &[Mark]) -> String {
    let lines: Vec<&str> = table.lines().collect();
    let heading = lines.len() - torques.len();
    let width = lines
        .get(heading)
        .map_or(0, |line| line.len() - line.trim_start().len());
    let digits = four(torques.first().copied().unwrap_or(0.0)).len();
    let line = |mark: &Mark| {
        format!(
            "{:>wide$}  – {}\n",
            four(mark.torque),
            mark.words,
            wide = width + digits
        )
    };
    let mut text = String::new();
    let mut left = marks.iter().peekable();
    for (place, each) in lines.iter().enumerate() {
        if let Some(torque) = place.checked_sub(heading).map(|row| torques[row]) {
            while let Some(mark) = left.next_if(|mark| mark.torque <= torque) {
                text.push_str(&line(mark));
            }
        }
        text.push_str(each);
        text.push('\n');
    }
    left.for_each(|mark| text.push_str(&line(mark)));
    text
}

/// The plain statement, line by line: the window, or none with what would open it.
pub(super) fn lines(sweep: &TorqueSweep) -> Vec<String> {
    let window = &sweep.window;
    let mut lines = vec![first(window)];
    if window.both.is_none() {
        lines.extend(opening(window));
    } else if window.heat.is_some() && !window.trusted {
        lines.push(
            "not for sure: the grid does not resolve the heat or the flatness decides (see cautions)"
                .to_owned(),
        );
    }
    lines.push(stated(sweep));
    if let Some(knee) = window.knee {
        lines.push(format!(
            "knee {} N·m: there the joint's own conductance has 90 % of what it can reach",
            four(knee)
        ));
    }
    lines
}

/// The same behind its label.
pub(super) fn statement(sweep: &TorqueSweep) -> String {
    let mut text = String::new();
    for (index, line) in lines(sweep).iter().enumerate() {
        let label = if index == 0 { "window   " } else { "         " };
        let body = wrapped(line, WIDTH - label.len(), 0);
        let body = body.replace('\n', &format!("\n{}", " ".repeat(label.len())));
        text.push_str(label);
        text.push_str(&body);
        text.push('\n');
    }
    text
}

fn first(window: &TorqueWindow) -> String {
    let Some(both) = window.both else {
        return format!("none: {}", shut(window));
    };
    let span = span(&both);
    let Some(_) = window.heat else {
        return format!(
            "{span} N·m by strength alone, ended by {}; no requirement is stated",
            both.high.by
        );
    };
    let band = match window.confidence {
        Some(share) => format!("at {} confidence", percent(share)),
        None => "at nominal, without draws".to_owned(),
    };
    format!(
        "{span} N·m: heat and strength are both met {band}; from {} to {}",
        named(&both, both.low.by),
        named(&both, both.high.by)
    )
}

/// How the stated torque stands to the window: inside, or on which side of which limit.
fn stated(sweep: &TorqueSweep) -> String {
    let (window, torque) = (&sweep.window, sweep.stated);
    let told = format!("the stated torque of {} N·m lies", four(torque));
    let mut against: Vec<String> = Vec::new();
    let broken = window.broken_at(torque);
    against.extend(broken.iter().map(|limit| match limit.side {
        Side::Least => format!(
            "below {}, which asks for at least {} N·m",
            limit.name,
            four(limit.torque)
        ),
        Side::Most => format!("beyond {}, at {} N·m", limit.name, four(limit.torque)),
    }));
    match sweep.heat_met_at(torque) {
        Some(false) => against.push(missed(window, torque)),
        None if window.heat.is_some() => {
            against.push("not swept, so that its heat is not judged".to_owned());
        }
        _ => {}
    }
    if window.most().is_none() {
        against.push("without a known limit of strength".to_owned());
    }
    match against.as_slice() {
        [] => format!("{told} inside"),
        _ => format!("{told} outside: {}", against.join("; ")),
    }
}

/// On which side of the torques that meet the requirement a torque lies.
fn missed(window: &TorqueWindow, torque: f64) -> String {
    let ranges = || window.heat.iter().flatten();
    let above = ranges().find(|range| range.low.torque > torque);
    let below = ranges().rfind(|range| range.high.torque < torque);
    match (below, above) {
        (None, Some(above)) => format!(
            "below the requirement, met from {} N·m",
            four(above.low.torque)
        ),
        (Some(below), None) => format!(
            "beyond the requirement, met up to {} N·m",
            four(below.high.torque)
        ),
        (Some(below), Some(above)) => format!(
            "the requirement is missed there, met up to {} and from {} N·m",
            four(below.high.torque),
            four(above.low.torque)
        ),
        (None, None) => "the requirement is missed there as at every torque swept".to_owned(),
    }
}

fn span(range: &Range) -> String {
    if range.low.torque > 0.0 {
        format!("{} to {}", four(range.low.torque), four(range.high.torque))
    } else {
        format!("up to {}", four(range.high.torque))
    }
}

/// What ends a range; where the sweep does, that more may be tried.
fn named(range: &Range, by: &str) -> String {
    match by {
        FIRST => format!(
            "{FIRST} ({} N·m; --from starts lower)",
            four(range.low.torque)
        ),
        LAST => format!("{LAST} ({} N·m; --to goes higher)", four(range.high.torque)),
        by => by.to_owned(),
    }
}

/// Why there is no window.
fn shut(window: &TorqueWindow) -> String {
    let least = window.limits.iter().find(|limit| limit.side == Side::Least);
    let most = window.most();
    let Some(strength) = window.strength else {
        return match (least, most) {
            (Some(least), Some(most)) => format!(
                "separation asks for at least {} N·m, and {} ends at {} N·m",
                four(least.torque),
                most.name,
                four(most.torque)
            ),
            _ => "no largest torque is known, so strength cannot be judged".to_owned(),
        };
    };
    if window.plates_fail {
        return "even perfect contact misses the requirement; no torque helps, plates, sink or heat must change"
            .to_owned();
    }
    let Some(range) = window.heat.as_ref().and_then(|heat| heat.first()) else {
        return "no torque swept meets the requirement".to_owned();
    };
    if range.low.torque >= strength.high.torque {
        format!(
            "heat asks for at least {} N·m, and {} ends at {} N·m",
            four(range.low.torque),
            strength.high.by,
            four(strength.high.torque)
        )
    } else {
        format!(
            "heat is met up to {} N·m only, and {} asks for at least {} N·m",
            four(range.high.torque),
            strength.low.by,
            four(strength.low.torque)
        )
    }
}

/// What would open the window: changes worked through, then what the limits say of the others.
fn opening(window: &TorqueWindow) -> Vec<String> {
    let mut lines = Vec::new();
    for trial in &window.trials {
        if let Some(range) = &trial.window {
            let on = match trial.judged {
                Judged::Fast => " (solved anew, fast)",
                Judged::AsSwept | Judged::Refused(_) => "",
            };
            lines.push(format!(
                "opened by {}: {} N·m{on}",
                trial.change,
                span(range)
            ));
        }
    }
    let shut = |judged: &Judged| -> Vec<&str> {
        let alike = window
            .trials
            .iter()
            .filter(|trial| trial.window.is_none() && trial.judged == *judged);
        alike.map(|trial| trial.change.as_str()).collect()
    };
    for (judged, how) in [
        (Judged::AsSwept, "alone not enough"),
        (Judged::Fast, "solved anew, fast, alone not enough"),
    ] {
        let shut = shut(&judged);
        if !shut.is_empty() {
            lines.push(format!("{how}: {}", shut.join("; ")));
        }
    }
    for trial in &window.trials {
        if let Judged::Refused(why) = &trial.judged {
            lines.push(format!("not possible: {}: {}", trial.change, plain(why)));
        }
    }
    if let Some(ratio) = window.force_ratio {
        let larger = window
            .larger_thread
            .as_ref()
            .map_or_else(String::new, |name| {
                format!(" ({name} of the same grade is the next that has it)")
            });
        lines.push(format!(
            "by the limits alone: {ratio:.2} times the force, which takes {ratio:.2} times the stress area{larger} or as many \
             times the bolts; a filler asks for less",
        ));
    } else if window.heat.as_ref().is_some_and(Vec::is_empty) && !window.plates_fail {
        lines.push(
            "not looked at: what is not named above, such as finer or flatter faces and thicker plates; the \
             drivers of `estimate` tell which"
                .to_owned(),
        );
    }
    lines
}
