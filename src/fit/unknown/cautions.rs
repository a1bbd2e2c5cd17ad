//! Whether a fit of one unknown says anything, and why not.

use std::fmt::Write;

use crate::{
    diagnostic::{Caution, registry},
    fit::{
        SIGNIFICANCE,
        profile::Verdict,
        unknown::{Answer, FINE_ENOUGH, Question},
    },
};

/// Contact share below which the plates and not the faces decide.
const SPREADING: f64 = 0.3;

/// Cautions of an answer, the graver ones first.
pub(super) fn of(asked: &Question, answer: &Answer) -> Vec<Caution> {
    let mut found = Vec::new();
    let profile = &answer.profile;
    let shown = |share: f64| asked.unknown.shown(asked.range.at(share));
    match profile.verdict {
        Verdict::Determined => {}
        Verdict::Undetermined => found.push(caution(
            "fit/not-determined",
            format!(
                "these measurements do not determine it: the 90 % interval is the whole range. {}",
                why(answer)
            ),
        )),
        Verdict::BelowOnly => found.push(caution(
            "fit/one-sided",
            format!(
                "these measurements bound it on one side: not below {}; up to {} all values are possible. {}",
                shown(profile.interval[0]),
                shown(1.0),
                why(answer)
            ),
        )),
        Verdict::AboveOnly => found.push(caution(
            "fit/one-sided",
            format!(
                "these measurements bound it on one side: not above {}; down to {} all values are possible. {}",
                shown(profile.interval[1]),
                shown(0.0),
                why(answer)
            ),
        )),
    }
    if profile.pieces > 1 {
        found.push(caution(
            "fit/several-ranges",
            format!(
                "the model reads alike at several values: the interval falls into {} parts, the outermost ends are told",
                profile.pieces
            ),
        ));
    }
    if let Some(chance) = profile.chance.filter(|chance| *chance < SIGNIFICANCE) {
        found.push(caution(
            "fit/model-misfit",
            format!(
                "no value explains these readings: chi squared {:.1} for {} of them, which chance exceeds in {:.2} %",
                profile.chi_squared,
                answer.readings,
                100.0 * chance
            ),
        ));
    }
    if answer.interpolation > FINE_ENOUGH * answer.whole {
        found.push(caution(
            "fit/coarse-profile",
            format!(
                "between solved values the model was missed by up to {:.1} %; narrow --from and --to",
                100.0 * answer.interpolation
            ),
        ));
    }
    registry::sort_by_gravity(&mut found);
    found
}

/// How far a conductance moves, from its change in ln.
pub(crate) fn moved(ln: f64) -> String {
    if ln < std::f64::consts::LN_2 {
        format!("by {:.1} %", 100.0 * ln.exp_m1())
    } else {
        format!("by a factor {:.3}", ln.exp())
    }
}

/// Why an interval is as wide as it is.
fn why(answer: &Answer) -> String {
    let percent = |ln: f64| 100.0 * ln.exp_m1();
    let moved = moved(answer.profile.movement);
    let mut text = format!(
        "Over the whole range the model moves {moved}, while readings leave {:.1} % open and other inputs {:.1} % (one standard deviation)",
        percent(answer.measured),
        percent(answer.other),
    );
    if answer.contact_share < SPREADING {
        let _ = write!(
            text,
            "; the faces are only {:.1} % of the measured resistance, spreading in the plates is the rest",
            100.0 * answer.contact_share
        );
    }
    text
}

fn caution(code: &'static str, text: String) -> Caution {
    Caution { code, text }
}
