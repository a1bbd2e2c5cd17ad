//! Faying faces: roughness, slope, plating.

use crate::{
    catalog,
    joint::{
        Bounds, Coating, Finish,
        collector::{Collector, Wording, fault},
        record::Record,
        tree::short,
        walk::missing,
    },
    units::{self, Quantity, RMS_OVER_MEAN, RZ_OVER_RA},
};

/// One standard deviation of the slope, as a factor, when the rule gives it: a judgement from the
/// spread of the four published rules.
const SLOPE_FACTOR: f64 = 1.4;

/// Root-mean-square slope of asperities from the roughness, 1.
///
/// ```text
/// m = 0.125 (Rq / 1 µm)^0.402
/// ```
///
/// | symbol | quantity | SI unit |
/// |---|---|---|
/// | `Rq` | root-mean-square roughness | m |
///
/// Valid: 0.216 µm ≤ Rq ≤ 9.6 µm (range from memory); elsewhere the estimate carries a caution. Published
/// rules differ by a factor 1.9 at 1.6 µm and 2.8 at 0.2 µm.
/// Source: Antonetti, White & Simons 1991, as quoted in the contact literature.
/// Checked: `slope_follows_the_roughness`, `slope_rule_gives_its_table`.
pub fn slope_from_roughness(roughness: f64) -> f64 {
    0.125 * (roughness * 1e6).powf(0.402)
}

/// Mean peak-to-valley height Rz of a face of root-mean-square roughness Rq, m, as a stated Rz is read:
/// Rz = 5.3 Ra, Rq = 1.25 Ra.
///
/// Judgement: Rz is 4 to 7 Ra for machined faces and Ra = Rq/1.25 for a Gaussian one; the guide values of
/// settling come in classes of a factor four.
pub fn peak_to_valley(rms_roughness: f64) -> f64 {
    RZ_OVER_RA / RMS_OVER_MEAN * rms_roughness
}

/// Reads a faying face of a plate, under its key.
pub(super) fn read(plate: &Record, key: &str, collector: &mut Collector) -> Option<Finish> {
    let record = plate.record(key)?;
    let before = collector.count();
    let roughness = roughness(record, collector);
    let coating = coating(record, collector);
    let roughness = roughness?;
    let stated = record.spread("slope").map(|slope| slope.bounds);
    let (slope, slope_factor) = if let Some(slope) = stated {
        (slope.nominal, 1.0)
    } else {
        let slope = slope_from_roughness(roughness.nominal);
        if !record.has("slope") {
            collector.assume(
                record.at("slope"),
                format!("{slope:.3}"),
                "from the roughness: 0.125 (Rq / 1 µm)^0.402, off by a factor 1.4 either way",
            );
        }
        (slope, SLOPE_FACTOR)
    };
    (collector.count() == before).then_some(Finish {
        roughness,
        slope,
        slope_factor,
        slope_spread: stated.filter(Bounds::is_spread),
        coating,
    })
}

fn roughness(record: &Record, collector: &mut Collector) -> Option<Bounds> {
    let process = match record.text("process") {
        // `finish = "Ra 0.8 µm"` says all that is needed.
        Some(text) if catalog::finish(text).is_none() => match units::parse_roughness(text) {
            Ok(roughness) if !record.has("roughness") => {
                if let Some(assumed) = roughness.assumed {
                    let value = format!("Rq {}", units::show(roughness.rq, Quantity::Length));
                    collector.assume(record.at("roughness"), value, assumed);
                }
                return in_range(record, roughness.rq, collector);
            }
            // A text with a number in it was meant as a roughness: `32 µin` lacks its parameter.
            Err(unit) if text.contains(|letter: char| letter.is_ascii_digit()) => {
                let told = fault(unit.code, &record.span("process"), unit.message)
                    .expecting("expected a roughness or a process");
                collector.report(match unit.help {
                    Some(help) => told.help(help),
                    None => told,
                });
                return None;
            }
            _ => {
                unknown_process(record, text, collector);
                return None;
            }
        },
        Some(text) => catalog::finish(text),
        None if record.has("process") => return None,
        None => None,
    };
    if let Some(spread) = record.spread("roughness") {
        return Some(spread.bounds);
    }
    if record.has("roughness") {
        return None;
    }
    let Some(process) = process else {
        collector.report(missing(record, "roughness", "roughness = \"Ra 0.8 µm\""));
        return None;
    };
    let average = &process.roughness_average;
    let [low, high] = average.range.unwrap_or([average.value; 2]);
    let bounds = Bounds::uniform([
        RMS_OVER_MEAN * low.min(average.value),
        RMS_OVER_MEAN * average.value,
        RMS_OVER_MEAN * high.max(average.value),
    ]);
    collector.assume(
        record.at("roughness"),
        format!(
            "Rq {} ({} to {})",
            units::show(bounds.nominal, Quantity::Length),
            units::show(bounds.low, Quantity::Length),
            units::show(bounds.high, Quantity::Length)
        ),
        format!(
            "typical of `{}`; a measured roughness is better",
            process.name
        ),
    );
    Some(bounds)
}

fn in_range(record: &Record, rq: f64, collector: &mut Collector) -> Option<Bounds> {
    let holds = (1e-9..=1e-3).contains(&rq);
    collector.require(holds, || {
        fault(
            "value/range",
            &record.span("process"),
            "this roughness is beyond what a machined face can have",
        )
        .expecting("from 1 nm to 1 mm")
    });
    holds.then(|| Bounds::exact(rq))
}

fn unknown_process(record: &Record, text: &str, collector: &mut Collector) {
    let help = if catalog::plating(text).is_some() {
        format!("it is a plating: `finish = {{ roughness = \"Ra 0.8 µm\", plating = \"{text}\" }}`")
    } else {
        "state the roughness: `finish = { roughness = \"Ra 0.8 µm\" }`".into()
    };
    let known = catalog::finishes().iter().flat_map(|finish| {
        std::iter::once(finish.name.as_str()).chain(finish.aliases.iter().map(String::as_str))
    });
    collector.report(
        fault(
            "name/unknown",
            &record.span("process"),
            format!("no finishing process is called `{}`", short(text)),
        )
        .expecting("expected a process or a roughness")
        .help(help)
        .nearest(text, known),
    );
}

fn coating(record: &Record, collector: &mut Collector) -> Option<Coating> {
    let plating_record = record.record("plating")?;
    let name = plating_record.text("name")?;
    if name.eq_ignore_ascii_case("none") {
        return None;
    }
    let Some(plating) = catalog::plating(name) else {
        let known = catalog::platings().iter().flat_map(|plating| {
            std::iter::once(plating.name.as_str()).chain(plating.aliases.iter().map(String::as_str))
        });
        collector.report(
            fault(
                "name/unknown",
                &plating_record.span("name"),
                format!("no plating is called `{}`", short(name)),
            )
            .expecting("not in the catalogue")
            .nearest(name, known.chain(std::iter::once("none"))),
        );
        return None;
    };
    let thickness = if let Some(thickness) = plating_record.number("thickness") {
        thickness
    } else {
        let typical = plating.typical_thickness.value;
        if !plating_record.has("thickness") {
            collector.assume(
                plating_record.at("thickness"),
                units::show(typical, Quantity::Length),
                format!("typical of `{}`", plating.name),
            );
        }
        typical
    };
    Some(Coating {
        plating: plating.clone(),
        thickness,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn slope_follows_the_roughness() {
        // The rule gives 0.125 at 1 µm exactly, and the catalogue's 0.218 at Rq 4.01 µm (3 digits).
        assert!((slope_from_roughness(1e-6) - 0.125).abs() < 1e-15);
        assert!((slope_from_roughness(4.01e-6) - 0.218).abs() < 0.0006);
    }

    // Half a unit of the last digit of the table.
    #[test]
    fn slope_rule_gives_its_table() {
        for (micrometres, wanted) in [(0.2, 0.065), (0.8, 0.114), (1.6, 0.151), (3.2, 0.200)] {
            let found = slope_from_roughness(micrometres * 1e-6);
            assert!((found - wanted).abs() < 6e-4, "{micrometres}: {found}");
        }
    }
}
