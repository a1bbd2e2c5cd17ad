//! Where the laws of an interface leave the range in which they were checked.

use crate::{
    conductance::{
        local::Local,
        spots::{LARGEST_SHARE, Mode},
    },
    diagnostic::Caution,
    joint::{FillerKind, Law},
};

/// Load over hardness at which the published power law ends.
const POWER_LAW_END: f64 = 0.02;

/// Load over hardness below which only the tallest peaks of a face touch.
const LIGHT_LOAD: f64 = 1e-6;

/// Pressure above which the scaling of a paste's bond line is no longer measured, Pa.
const PASTE_END: f64 = 1e6;

pub(super) fn of(local: &Local, peak_pressure: f64) -> Vec<Caution> {
    let mut cautions = Vec::new();
    if peak_pressure <= 0.0 {
        return cautions;
    }
    if let Some(points) = &local.interface.measured {
        beyond_measured(points, peak_pressure, &mut cautions);
    } else if local.filling.is_some() {
        beyond_filler(local, peak_pressure, &mut cautions);
    } else {
        beyond_spots(local, peak_pressure, &mut cautions);
    }
    cautions
}

fn beyond_measured(points: &[(f64, f64)], peak: f64, cautions: &mut Vec<Caution>) {
    let (Some(first), Some(last)) = (points.first(), points.last()) else {
        return;
    };
    if peak > last.0 || peak < first.0 {
        let text = format!(
            "the pressure reaches {}, the measured points cover {} to {}; above, the last value \
             is held, below, it goes straight to the value without load",
            megapascals(peak),
            megapascals(first.0),
            megapascals(last.0),
        );
        cautions.push(caution("measured/outside-range", text));
    }
}

fn beyond_filler(local: &Local, peak: f64, cautions: &mut Vec<Caution>) {
    match &local.interface.filler {
        Some(FillerKind::Table { points }) => {
            let (Some(first), Some(last)) = (points.first(), points.last()) else {
                return;
            };
            if peak > last.0 || first.0 > 0.0 {
                let text = format!(
                    "the pressure runs from 0 to {}, the table of the filler from {} to {}; its \
                     end values are held",
                    megapascals(peak),
                    megapascals(first.0),
                    megapascals(last.0),
                );
                cautions.push(caution("filler/outside-table", text));
            }
        }
        Some(FillerKind::Foil { hardness, .. }) if peak > *hardness => {
            let text = format!(
                "the pressure reaches {}, the foil yields at {}: beyond that its boundaries are held and it thins \
                 and creeps out, which is left out",
                megapascals(peak),
                megapascals(*hardness),
            );
            cautions.push(caution("filler/foil-flows", text));
        }
        // One of stated bond line has no law to leave.
        Some(FillerKind::Paste {
            thinnest,
            yield_stress,
            ..
        }) if peak > PASTE_END && *yield_stress > 0.0 => {
            let text = format!(
                "the pressure reaches {}, the bond line of pastes is known to about {}; it is \
                 kept at {:.0} µm or more, the largest filler particle",
                megapascals(peak),
                megapascals(PASTE_END),
                thinnest * 1e6,
            );
            cautions.push(caution("filler/paste-range", text));
        }
        _ => {}
    }
}

fn beyond_spots(local: &Local, peak: f64, cautions: &mut Vec<Caution>) {
    let load = local.spots.load(peak);
    let law = local.interface.law;
    if local.spots.overlap(peak) > LARGEST_SHARE {
        let text = format!(
            "the pressure reaches {}, {:.2} of the hardness: the spots run together, and the \
             conductance is held where they cover half of the face",
            megapascals(peak),
            load,
        );
        cautions.push(caution("conductance/beyond-hardness", text));
    } else if law == Law::PlasticPower && load > POWER_LAW_END {
        let text = format!(
            "the pressure reaches {}, {load:.3} of the hardness; the power law is published up \
             to {POWER_LAW_END} and reads low above",
            megapascals(peak),
        );
        cautions.push(caution("conductance/law-range", text));
    }
    if load < LIGHT_LOAD {
        let text = format!(
            "the pressure reaches only {load:.1e} of the hardness: the tallest peaks decide, \
             which no law of Gaussian faces knows"
        );
        cautions.push(caution("conductance/light-load", text));
    }
    let strain = Mode::elastic_plastic(&local.spots.asperities(peak)).strain;
    let mismatch = match law {
        Law::Elastic if strain > MIDDLE_STRAIN => Some(("elastic", "plastically")),
        Law::Plastic | Law::PlasticPower if strain < MIDDLE_STRAIN => {
            Some(("plastic", "elastically"))
        }
        _ => None,
    };
    if let Some((chosen, really)) = mismatch {
        let text = format!(
            "the {chosen} law is chosen, but asperities this steep and hard (contact strain \
             {strain:.0}) give way mostly {really}; the elastic-plastic law knows both"
        );
        cautions.push(caution("conductance/law-range", text));
    }
}

/// Contact strain at which the elastic and the plastic hardness are equal: 1.67 · 2.76 · √2.
const MIDDLE_STRAIN: f64 = 6.52;

fn megapascals(pressure: f64) -> String {
    format!("{:.3} MPa", pressure * 1e-6)
}

fn caution(code: &'static str, text: String) -> Caution {
    Caution { code, text }
}
