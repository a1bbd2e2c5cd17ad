//! The pressure part of the report: where the force presses, where the faces part, and what the
//! cone alone would have said.

use crate::{
    estimate::{CaseResult, Flatness, InterfaceResult, SolvedField, SolverHealth},
    report::{
        json::differences,
        number::{brief, four, percent, wrapped},
        text::{Detail, WIDTH},
    },
};
use std::fmt::Write;

/// Pressure, and for a solved field gap, flatness and the cone beside; a line each.
pub fn field(case: &CaseResult, detail: Detail) -> String {
    let pressure = &case.pressure;
    let (peak, area) = (pressure.peak / 1e6, pressure.contact_area * 1e6);
    // On a solved field the grid scatters both by a tenth and more.
    let [peak, area] = match pressure.solved {
        Some(_) => [
            format!("about {}", two(peak)),
            format!(" on about {}", two(area)),
        ],
        None => [four(peak), format!(", contact on {}", four(area))],
    };
    let place = match case.interfaces.as_slice() {
        [first, _, ..] => format!(" between {}", first.between()),
        _ => String::new(),
    };
    let mut text = wrapped(
        &format!(
            "pressure{place}: {peak} MPa at most{area} mm², 95 % of the force within {} mm of a bolt axis",
            four(pressure.radius_95 * 1e3),
        ),
        WIDTH,
        2,
    );
    text.push('\n');
    let mut line = |line: String| {
        text.push_str(&wrapped(&line, WIDTH, 2));
        text.push('\n');
    };
    let gap = match (pressure.gap_mean, pressure.gap_max) {
        (Some(mean), Some(max)) => Some(format!(
            "gap between the faces {} µm mean, {} µm widest",
            four(mean * 1e6),
            four(max * 1e6)
        )),
        _ => None,
    };
    let Some(solved) = &pressure.solved else {
        if let Some(gap) = gap {
            line(gap);
        }
        return text;
    };
    let mean = format!(
        "mean radius of the force {} mm",
        four(solved.mean_force_radius * 1e3)
    );
    line(gap.map_or(mean.clone(), |gap| format!("{mean}; {gap}")));
    if let Some(told) = flatness(&solved.flatness) {
        line(told);
    }
    if case.interfaces.len() > 1 {
        for interface in &case.interfaces {
            line(stacked(interface));
        }
    }
    if let Some(told) = beside(solved, case) {
        line(told);
    }
    if detail == Detail::Full {
        line(health(&solved.health));
        if let Some(error) = case.draw_error {
            line(format!(
                "draws are read from surfaces through solved states, off by {} at the states solved to check them",
                percent(error)
            ));
        }
    }
    text
}

/// One interface of a stack.
fn stacked(interface: &InterfaceResult) -> String {
    let gap = interface.gap_max.map_or_else(String::new, |gap| {
        format!(", widest gap {} µm", four(gap * 1e6))
    });
    format!(
        "{}: contact only {} W/K, mean drop {} K/W, about {} MPa at most on about {} mm²{gap}",
        interface.between(),
        four(interface.contact),
        four(interface.drop),
        two(interface.peak / 1e6),
        two(interface.contact_area * 1e6),
    )
}

/// Two digits.
fn two(value: f64) -> String {
    if !value.is_finite() || value <= 0.0 {
        return four(value);
    }
    let step = 10.0_f64.powf(value.log10().floor() - 1.0);
    brief((value / step).round() * step)
}

/// Whether faces that are not flat are pressed together.
fn flatness(flatness: &Flatness) -> Option<String> {
    let verdict = if flatness.closes()? {
        "closes"
    } else {
        "stays open"
    };
    let micrometres = |metres: f64| four(metres * 1e6);
    Some(match *flatness {
        Flatness::Flat => return None,
        Flatness::Known {
            initial,
            left,
            flat,
        } => format!(
            "initial gap of {} µm {verdict}: the bolts leave {} µm at the widest, between flat faces {} µm",
            brief(initial * 1e6),
            micrometres(left),
            micrometres(flat)
        ),
        Flatness::Stated { height, left, flat } => format!(
            "stated flatness {} µm {verdict}: taken convex and concave, widest gap {} or {} µm (flat {})",
            brief(height * 1e6),
            micrometres(left[0]),
            micrometres(left[1]),
            micrometres(flat)
        ),
    })
}

/// The cone with its differences from the solved field.
fn beside(solved: &SolvedField, case: &CaseResult) -> Option<String> {
    let cone = solved.cone.as_ref()?;
    let [radius, contact, whole] = differences(cone, case).map(signed);
    Some(format!(
        "cone: 95 % within {} mm ({radius}), contact only {} ({contact}), source to sink {} K/W ({whole})",
        four(cone.radius_95 * 1e3),
        four(cone.contact),
        four(cone.source_to_sink),
    ))
}

/// A difference in whole percent with its sign.
fn signed(share: f64) -> String {
    if !share.is_finite() {
        return "–".to_owned();
    }
    let percent = (share * 100.0).round();
    let sign = match percent {
        p if p > 0.0 => "+",
        p if p < 0.0 => "−",
        _ => "±",
    };
    format!("{sign}{} %", percent.abs())
}

/// What the solver left over, for those who doubt it.
fn health(health: &SolverHealth) -> String {
    let residual = health
        .residual
        .map_or_else(String::new, |residual| format!(" {residual:.0e} residual,"));
    let mut text = format!(
        "solver: {} unknowns, {} steps, {} rounds; off by {:.0e} force, {:.0e} contact,{residual} {:.0e} heat",
        health.unknowns,
        health.steps,
        health.rounds,
        health.force_balance.abs(),
        health.complementarity,
        health.heat_balance.abs(),
    );
    if health.energy_fell == Some(false) {
        let _ = write!(text, "; energy ROSE in a step");
    }
    text
}
