//! How a bolt gets its clamp force: torque with friction, or a known preload.

use crate::{
    catalog,
    joint::{
        Bounds, Friction, Tightening, TorqueTightening,
        collector::{Collector, Wording, fault},
        plates::two_ways,
        record::{Record, Spread, Width},
        tree::short,
        walk::missing,
    },
    numerics::distribution::Shape,
};

/// Tolerance of a torque wrench when none is stated; ISO 6789 tools keep 4 to 6 %.
const TOLERANCE: f64 = 0.05;

/// Half-width taken for a single friction value: the scatter of lubricated bolts tightened by
/// torque in NASA practice.
const SINGLE_FRICTION: f64 = 0.25;

/// Reads the tightening of a fastener group.
pub(super) fn read(record: &Record, collector: &mut Collector) -> Option<Tightening> {
    let scatter = scatter(record, collector);
    match (record.has("torque"), record.has("preload")) {
        (true, true) => {
            collector.report(two_ways(record, ["torque", "preload"]));
            None
        }
        (false, false) => {
            collector.report(missing(record, "torque", "torque = \"1.7 N·m\"").help(
                "for example `torque = \"1.7 N·m\"`, or the clamp force: `preload = \"5 kN\"`",
            ));
            None
        }
        (false, true) => {
            collector.assume(
                record.at("friction"),
                "class B, 0.08 to 0.16",
                "the preload is stated, so friction only tells the torsion in strength use",
            );
            let preload = record.spread("preload")?;
            known_preload(record, preload, scatter?, collector)
        }
        (true, false) => torque(record, scatter, collector),
    }
}

fn known_preload(
    record: &Record,
    preload: Spread,
    scatter: Option<f64>,
    collector: &mut Collector,
) -> Option<Tightening> {
    let bounds = match (scatter, preload.width) {
        (None, _) => preload.bounds,
        (Some(scatter), Width::Single) => widened(preload.bounds.nominal, scatter),
        (Some(_), Width::Range) => {
            let key = if record.has("scatter") {
                "scatter"
            } else {
                "method"
            };
            collector.report(two_ways(record, ["preload", key]).help(
                "`preload` is a range already; state its nominal value alone to have it scattered",
            ));
            return None;
        }
    };
    Some(Tightening::Preload(bounds))
}

/// The scatter that stands for friction and tool together: the outer option is none when it is
/// faulty, the inner one when none is stated.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
fn scatter(record: &Record, collector: &mut Collector) -> Option<Option<f64>> {
    match (record.has("scatter"), record.has("method")) {
        (false, false) => Some(None),
        (true, true) => {
            collector.report(two_ways(record, ["scatter", "method"]));
            None
        }
        (true, false) => record.number("scatter").map(Some),
        (false, true) => {
            let name = record.text("method")?;
            let Some(method) = catalog::method(name) else {
                let known = catalog::methods().iter().map(|method| method.name.as_str());
                collector.report(
                    fault(
                        "name/unknown",
                        &record.span("method"),
                        format!("no tightening method is called `{}`", short(name)),
                    )
                    .expecting("not in the catalogue")
                    .help("`ringsum list methods` names all; or state the scatter: `scatter = \"25 %\"`")
                    .nearest(name, known),
                );
                return None;
            };
            let widest = method.scatter[1];
            collector.assume(
                record.at("scatter"),
                percent(widest),
                format!("the wider end of `{}` ({})", method.name, method.family),
            );
            Some(Some(widest))
        }
    }
}

#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
fn torque(
    record: &Record,
    scatter: Option<Option<f64>>,
    collector: &mut Collector,
) -> Option<Tightening> {
    let friction = friction(record, scatter.flatten(), collector);
    let table = record.record("torque")?;
    let stated = tool(table, collector)?;
    let tolerance = match (table.number("tolerance"), stated) {
        (Some(tolerance), _) => tolerance,
        (None, Some(stated)) => stated.high / stated.nominal - 1.0,
        (None, None) if table.has("tolerance") => return None,
        (None, None) => {
            if scatter.flatten().is_none() {
                collector.assume(
                    table.at("tolerance"),
                    percent(TOLERANCE),
                    "not stated; usual for a torque wrench",
                );
            }
            TOLERANCE
        }
    };
    let running = match table.number("running") {
        Some(running) => running,
        None if table.has("running") => return None,
        None => {
            collector.assume(
                table.at("running"),
                "0 N·m",
                "not stated: taken as a free-running thread",
            );
            0.0
        }
    };
    let torque = table.number("value")?;
    let most = table.stated_spread("running");
    collector.require(most.map_or(running, |most| most.high) < torque, || {
        fault(
            "value/min-above-max",
            &table.span("running"),
            "the running torque takes the whole tightening torque",
        )
        .expecting("expected below the tightening torque")
        .help("`value` is the torque at the wrench, running torque included")
    });
    Some(Tightening::Torque(TorqueTightening {
        torque,
        tolerance,
        tool: stated.map_or(Shape::Uniform, |stated| stated.shape),
        running,
        running_spread: table.stated_spread("running"),
        running_stated: table.has("running"),
        friction: friction?,
        scatter: scatter?,
    }))
}

/// The torque with a spread of its own, which then is the tolerance of the tool: the outer option is
/// none when it is faulty.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
fn tool(table: &Record, collector: &mut Collector) -> Option<Option<Bounds>> {
    /// Ends that lie as far below as above within rounding, relative.
    const EVEN: f64 = 1e-9;
    let Some(stated) = table.stated_spread("value") else {
        return Some(None);
    };
    if table.has("tolerance") {
        collector.report(two_ways(table, ["value", "tolerance"]).help(
            "the spread of `value` is the tolerance of the tool already; state one of the two",
        ));
        return None;
    }
    let [below, above] = [
        1.0 - stated.low / stated.nominal,
        stated.high / stated.nominal - 1.0,
    ];
    let even = (below - above).abs() <= EVEN && stated.shape != Shape::LogNormal;
    collector.require(even, || {
        fault(
            "value/distribution",
            &table.span("value"),
            "a tool errs as far below its torque as above",
        )
        .expecting("expected the same width either way")
        .help("for example `value = \"1.7 N·m ± 4 %\"`")
    });
    even.then_some(Some(stated))
}

fn friction(record: &Record, scatter: Option<f64>, collector: &mut Collector) -> Option<Friction> {
    let table = match record.record("friction") {
        Some(table) => table,
        None if record.has("friction") => return None,
        None => {
            let class = catalog::friction_record("B")?;
            collector.assume(
                record.at("friction"),
                format!("class B, {} to {}", class.values[0], class.values[2]),
                "not stated; class B is the usual aim of lubricated bolts",
            );
            return Some(coefficients(Bounds::uniform(class.values)));
        }
    };
    let stated: Vec<&str> = ["class", "thread", "nut_factor"]
        .into_iter()
        .filter(|key| table.has(key))
        .collect();
    match stated.as_slice() {
        ["class"] => {
            if table.has("head") {
                collector.report(two_ways(table, ["class", "head"]));
            }
            named(table, "class", collector)
        }
        ["nut_factor"] => match table.spread("nut_factor") {
            Some(spread) => {
                let single = Single {
                    table,
                    key: "nut_factor",
                    scatter,
                };
                Some(Friction::NutFactor(single.widened(spread, collector)))
            }
            None => named(table, "nut_factor", collector),
        },
        ["thread"] => {
            let thread = Single {
                table,
                key: "thread",
                scatter,
            }
            .widened(table.spread("thread")?, collector);
            let head = match table.spread("head") {
                Some(head) => Single {
                    table,
                    key: "head",
                    scatter,
                }
                .widened(head, collector),
                None if table.has("head") => return None,
                None => {
                    collector.assume(table.at("head"), "as in the thread", "not stated");
                    thread
                }
            };
            Some(Friction::Coefficients { thread, head })
        }
        [] => {
            collector.report(missing(table, "class", "friction = { class = \"B\" }"));
            None
        }
        [first, .., last] => {
            collector.report(two_ways(table, [first, last]));
            None
        }
        [_] => None,
    }
}

/// A friction record by name; a class may be asked for where a nut factor stands and vice versa.
fn named(table: &Record, key: &str, collector: &mut Collector) -> Option<Friction> {
    let name = table.text(key)?;
    let Some(found) = catalog::friction_record(name) else {
        let known = catalog::friction()
            .iter()
            .map(|record| record.name.as_str());
        collector.report(
            fault(
                "name/unknown",
                &table.span(key),
                format!("no friction is called `{}`", short(name)),
            )
            .expecting("expected class A to E or a condition of the catalogue")
            .help("`ringsum list friction` names all")
            .nearest(name, known),
        );
        return None;
    };
    let bounds = Bounds::uniform(found.values);
    Some(if found.nut_factor {
        Friction::NutFactor(bounds)
    } else {
        coefficients(bounds)
    })
}

/// A friction value that may stand alone, without a range.
struct Single<'a> {
    table: &'a Record,
    key: &'static str,
    scatter: Option<f64>,
}

impl Single<'_> {
    /// Its bounds: a single value is widened unless a scatter is stated that covers friction.
    fn widened(&self, spread: Spread, collector: &mut Collector) -> Bounds {
        if spread.width == Width::Range || self.scatter.is_some() {
            return spread.bounds;
        }
        let nominal = spread.bounds.nominal;
        collector.assume(
            self.table.at(self.key),
            format!("{nominal} ± {}", percent(SINGLE_FRICTION)),
            "one value is stated; friction of lubricated bolts scatters this much",
        );
        widened(nominal, SINGLE_FRICTION)
    }
}

fn widened(nominal: f64, scatter: f64) -> Bounds {
    Bounds::uniform([
        nominal * (1.0 - scatter),
        nominal,
        nominal * (1.0 + scatter),
    ])
}

fn coefficients(bounds: Bounds) -> Friction {
    Friction::Coefficients {
        thread: bounds,
        head: bounds,
    }
}

fn percent(fraction: f64) -> String {
    format!("{:.0} %", 100.0 * fraction)
}
