//! What to know of a fit before its law is used.

use crate::{
    diagnostic::{Caution, registry},
    fit::{
        power::{Bend, PowerLaw},
        series::{Branch, Series, Shape},
    },
    units::show,
};

/// Cautions of all branches, the graver ones first.
pub(super) fn of(series: &Series) -> Vec<Caution> {
    let mut found = Vec::new();
    for branch in &series.branches {
        let named = branch
            .direction
            .map_or_else(String::new, |way| format!("{}: ", way.name()));
        outliers(series, (branch, &named), &mut found);
        match &branch.shape {
            Shape::Law(law) => of_law(law, &named, &mut found),
            Shape::Table(table) if table.levelled > 0 => found.push(caution(
                "fit/levelled",
                format!(
                    "{named}{} of {} rows fell as the load rose and were put level with their neighbours",
                    table.levelled,
                    table.rows.len()
                ),
            )),
            Shape::Table(_) => {}
        }
    }
    if let Some(found_here) = series.hysteresis
        && let Some([low, high]) = found_here.interval
        && (low > 1.0 || high < 1.0)
    {
        found.push(caution(
            "fit/hysteresis",
            format!(
                "unloading conducts {:.2} times what loading does ({low:.2} to {high:.2}, 90 %) at {}",
                found_here.ratio,
                show(found_here.at, series.abscissa.quantity()),
            ),
        ));
    }
    let specimens = |branch: &Branch| {
        let mut names: Vec<_> = branch
            .readings
            .iter()
            .map(|row| row.specimen.clone())
            .collect();
        names.sort();
        names.dedup();
        names.len()
    };
    if series.branches.iter().map(specimens).max() == Some(1) {
        found.push(caution(
            "fit/one-specimen",
            "all readings are of one specimen: the scatter holds what one specimen repeats, not what specimens differ by"
                .to_owned(),
        ));
    }
    registry::sort_by_gravity(&mut found);
    found
}

fn outliers(series: &Series, (branch, named): (&Branch, &str), found: &mut Vec<Caution>) {
    for outlier in &branch.outliers {
        let reading = &branch.readings[outlier.index];
        let x = reading.abscissa.unwrap_or(f64::NAN);
        found.push(caution(
            "fit/outlier",
            format!(
                "{named}line {} ({}) stands apart: {:+.1} standard deviations from the other readings, {:.1} expected at most; it is kept, `--without {}` leaves it out",
                reading.line,
                show(x, series.abscissa.quantity()),
                outlier.residual,
                outlier.threshold,
                reading.line,
            ),
        ));
    }
}

fn of_law(law: &PowerLaw, named: &str, found: &mut Vec<Caution>) {
    if let Some(bend) = law.bend.filter(Bend::shows) {
        found.push(caution(
            "fit/curved",
            format!(
                "{named}the readings bend away from a power law (the exponent {} with load, chance {:.1} %); `--as table` follows them",
                if bend.curvature > 0.0 { "rises" } else { "falls" },
                100.0 * bend.chance,
            ),
        ));
    }
    if let Some(agreement) = law.agreement {
        if agreement.too_small() {
            found.push(caution(
                "fit/scatter-understated",
                format!(
                    "{named}the readings scatter {:.1} times what `sigma` states (chi squared {:.1} on {} degrees of freedom); bands and scatter are widened to the residuals",
                    agreement.reduced.sqrt(),
                    agreement.chi_squared,
                    law.degrees,
                ),
            ));
        } else if agreement.too_large() {
            found.push(caution(
                "fit/scatter-overstated",
                format!(
                    "{named}the readings scatter only {:.2} of what `sigma` states (chi squared {:.2} on {} degrees of freedom); the stated value is kept",
                    agreement.reduced.sqrt(),
                    agreement.chi_squared,
                    law.degrees,
                ),
            ));
        }
    }
    let slope = law.covariance[1][1].sqrt() * law.reach;
    if law.exponent + slope < 0.0 {
        found.push(caution(
            "fit/falling",
            format!(
                "{named}the conductance falls as the load rises (exponent {:.2} ± {slope:.2}); no contact law does that",
                law.exponent
            ),
        ));
    } else if law.exponent - slope <= 0.0 {
        found.push(caution(
            "fit/hardly-rising",
            format!(
                "{named}the readings hardly follow the load (exponent {:.2} ± {slope:.2}), which faces alone do with about 0.95: do they hold the plates as well? `--unknown` holds the whole joint against such readings",
                law.exponent
            ),
        ));
    }
}

fn caution(code: &'static str, text: String) -> Caution {
    Caution { code, text }
}
