//! What fills the joint, and what the user has measured.

mod layer;

use crate::{
    catalog::{self, FillerRecord},
    joint::{
        Filler, FillerKind, LawLoad, Measured, MeasuredKind,
        collector::{Collector, Wording, fault},
        plates::{PlateDraft, two_ways},
        record::Record,
        seats::unknown_plate,
        sections::{FILLER, MEASURED, MEASURED_LAW},
        tree::{Span, short},
        walk::missing,
    },
    units::{self, Quantity},
};

/// Largest particle of a paste that states none, m: 10–40 µm is usual (memory).
const THINNEST: f64 = 20e-6;

/// Thickness of a paste as applied when none is stated, m (judgement: a stencilled layer).
const APPLIED: f64 = 100e-6;

/// Scatter of a filler of the catalogue and of one described by the user (judgement).
const SCATTER: [f64; 2] = [0.3, 0.2];

/// Scatter of the user's own measurements (judgement).
const MEASURED_SCATTER: f64 = 0.1;

/// Reads `[[filler]]`: one for each interface, none where there is none; none at all when one is
/// faulty or the plates are not known.
pub(super) fn read(
    file: &Record,
    plates: Option<&[PlateDraft]>,
    collector: &mut Collector,
) -> Option<Vec<Option<Filler>>> {
    let mut found: Option<Vec<Option<Filler>>> = plates.map(|plates| vec![None; plates.len() - 1]);
    if file.is_faulty("filler") {
        return None;
    }
    let mut taken: Vec<usize> = Vec::new();
    for record in file.records("filler") {
        let filler = one(record, collector);
        let interface = plates.and_then(|plates| interface(record, plates, collector));
        let (Some(filler), Some(interface)) = (filler, interface) else {
            found = None;
            continue;
        };
        if taken.contains(&interface) {
            collector.report(
                fault(
                    "filler/interface",
                    &record.span("between"),
                    "a second filler lies between the same plates",
                )
                .expecting("expected one for each interface")
                .help("describe both together: their area resistances add, `model = \"table\"`"),
            );
            found = None;
            continue;
        }
        taken.push(interface);
        if let Some(found) = &mut found {
            found[interface] = filler;
        }
    }
    found
}

/// Index of the interface in which a filler lies.
fn interface(record: &Record, plates: &[PlateDraft], collector: &mut Collector) -> Option<usize> {
    let pairs = || {
        let named = plates.windows(2).map(|pair| {
            format!(
                "`between = [\"{}\", \"{}\"]`",
                short(&pair[0].name),
                short(&pair[1].name)
            )
        });
        named.collect::<Vec<String>>().join(" or ")
    };
    let Some([one, other]) = record.names("between") else {
        if record.has("between") {
            return None;
        }
        let only = plates.len() == 2;
        collector.require(only, || {
            fault(
                "filler/interface",
                &record.place,
                format!("between which of the {} plates?", plates.len()),
            )
            .expecting("expected `between`")
            .help(format!("state {}", pairs()))
        });
        return only.then_some(0);
    };
    let mut place = |(name, span): &(String, Span)| {
        let place = plates.iter().position(|plate| plate.name == *name);
        if place.is_none() {
            collector.report(unknown_plate(name, span, plates));
        }
        place
    };
    let (one, other) = (place(one), place(other));
    let (one, other) = (one?, other?);
    let adjacent = one.abs_diff(other) == 1;
    collector.require(adjacent, || {
        fault(
            "filler/interface",
            &record.span("between"),
            "these plates do not lie on each other",
        )
        .expecting("expected neighbours")
        .help(format!("state {}", pairs()))
    });
    adjacent.then_some(one.min(other))
}

/// Reads a filler: the outer option is none when it is faulty.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
fn one(record: &Record, collector: &mut Collector) -> Option<Option<Filler>> {
    let name = record.text("name");
    if let Some(name) = name
        && name.eq_ignore_ascii_case("none")
    {
        return Some(None);
    }
    let known = name.and_then(catalog::filler);
    let own = ["model", "conductivity", "table", "thickness", "bond_line"];
    if known.is_none() && !own.iter().any(|key| record.has(key)) {
        collector.report(unknown(record, name));
        return None;
    }
    let kind = kind(record, known, collector)?;
    let default = SCATTER[usize::from(known.is_none())];
    let spring = layer::spring(record, (known, &kind), collector)?;
    Some(Some(Filler {
        name: known.map_or_else(
            || name.unwrap_or("filler").to_owned(),
            |known| known.name.clone(),
        ),
        kind,
        factor: 1.0 + scatter(record, default, collector)?,
        modulus: spring.modulus,
        thickness: spring.thickness,
        density: known.and_then(|known| Some(known.density.as_ref()?.value)),
    }))
}

fn unknown(record: &Record, name: Option<&str>) -> crate::diagnostic::Fault {
    let Some(name) = name else {
        return missing(record, "name", "name = \"graphite foil\"");
    };
    let known = catalog::fillers().iter().flat_map(|filler| {
        std::iter::once(filler.name.as_str()).chain(filler.aliases.iter().map(String::as_str))
    });
    fault(
        "name/unknown",
        &record.span("name"),
        format!("no filler is called `{}`", short(name)),
    )
    .expecting("not in the catalogue, and no model is stated")
    .help("describe your own: `model = \"layer\"` with `conductivity` and `thickness`")
    .nearest(name, known)
}

fn scatter(record: &Record, default: f64, collector: &mut Collector) -> Option<f64> {
    match record.number("scatter") {
        None if record.has("scatter") => None,
        None => {
            collector.assume(
                record.at("scatter"),
                format!("{:.0} %", 100.0 * default),
                "not stated; a judgement",
            );
            Some(default)
        }
        scatter => scatter,
    }
}

fn kind(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<FillerKind> {
    if record.has("table") {
        return table(record, collector);
    }
    let model = match record.text("model") {
        Some(model) => model,
        None if record.has("model") => return None,
        None => unstated(record, known),
    };
    match model {
        "fluid" => Some(FillerKind::Fluid {
            conductivity: conductivity(record, known, collector)?,
        }),
        "paste" => paste(record, known, collector),
        "table" => {
            collector.report(missing(record, "table", &line("table")));
            None
        }
        "foil" => foil(record, known, collector),
        _ => layer::read(record, known, collector),
    }
}

/// A foil that yields: thickness, conductivity and hardness, of the file or of the catalogue.
fn foil(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<FillerKind> {
    if record.has("boundary") {
        collector.report(two_ways(record, ["model", "boundary"]).help(
            "the boundaries of a foil follow from its hardness; with a boundary of your own it is \
             `model = \"layer\"`",
        ));
        return None;
    }
    let thickness = layer::thickness(record, known, collector);
    let conductivity = conductivity(record, known, collector);
    let from_catalogue = known.and_then(|known| known.hardness.as_ref());
    let hardness = match (record.number("hardness"), from_catalogue) {
        (None, _) if record.has("hardness") => None,
        (None, Some(datum)) => {
            collector.assume(
                record.at("hardness"),
                units::show(datum.value, Quantity::Pressure),
                format!("catalogue value: {}", datum.source),
            );
            Some(datum.value)
        }
        (None, None) => {
            collector.report(missing(record, "hardness", &line("hardness")));
            None
        }
        (stated, _) => stated,
    };
    Some(FillerKind::Foil {
        conductivity: conductivity?,
        thickness: thickness?,
        hardness: hardness?,
    })
}

/// The model of a filler whose file names none.
///
/// A bond line is what a paste was squeezed to: it was liquid then and fills what the bolts open. It is a
/// layer where the file tells what only a layer has, or names a pad, foil or bond.
fn unstated(record: &Record, known: Option<&FillerRecord>) -> &'static str {
    let solid = ["boundary", "modulus"].iter().any(|key| record.has(key));
    let squeezed = record.has("bond_line") && !solid;
    if record.has("thickness") || record.has("bond_line") && solid {
        return "layer";
    }
    match known.map(|known| known.model.as_str()) {
        Some("fluid") if !squeezed => "fluid",
        Some("fluid" | "paste") => "paste",
        None if squeezed => "paste",
        _ => "layer",
    }
}

fn line(key: &str) -> String {
    FILLER
        .field(key)
        .map(crate::joint::fields::Field::line)
        .unwrap_or_default()
}

fn conductivity(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<f64> {
    match (record.number("conductivity"), known) {
        (Some(conductivity), _) => Some(conductivity),
        (None, _) if record.has("conductivity") => None,
        (None, Some(known)) => {
            collector.assume(
                record.at("conductivity"),
                units::show(known.conductivity.value, Quantity::Conductivity),
                format!("catalogue value of `{}`", known.name),
            );
            Some(known.conductivity.value)
        }
        (None, None) => {
            collector.report(missing(record, "conductivity", &line("conductivity")));
            None
        }
    }
}

fn table(record: &Record, collector: &mut Collector) -> Option<FillerKind> {
    Some(FillerKind::Table {
        points: rising(record, "table", collector)?,
    })
}

fn paste(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<FillerKind> {
    if record.has("bond_line") {
        return declared(record, known, collector);
    }
    let conductivity = conductivity(record, known, collector);
    let from_catalogue = known.and_then(|known| known.yield_stress.as_ref());
    let yield_stress = match (record.number("yield_stress"), from_catalogue) {
        (None, _) if record.has("yield_stress") => None,
        (None, Some(datum)) => {
            collector.assume(
                record.at("yield_stress"),
                units::show(datum.value, Quantity::Pressure),
                format!("catalogue value: {}", datum.source),
            );
            Some(datum.value)
        }
        (None, None) => {
            collector.report(missing(record, "yield_stress", &line("yield_stress")));
            None
        }
        (stated, _) => stated,
    };
    let mut length = |key: &str, default: f64, why: &str| match record.number(key) {
        None if record.has(key) => None,
        None => {
            collector.assume(record.at(key), units::show(default, Quantity::Length), why);
            Some(default)
        }
        stated => stated,
    };
    let thinnest = length(
        "thinnest",
        THINNEST,
        "not stated; particles of pastes are 10 to 40 µm",
    );
    let applied = length("applied", APPLIED, "not stated; a judgement");
    let (thinnest, applied) = (thinnest?, applied?);
    collector.require(thinnest <= applied, || {
        fault(
            "value/min-above-max",
            &record.span(if record.has("applied") {
                "applied"
            } else {
                "thinnest"
            }),
            "the paste is applied thinner than its thinnest bond line",
        )
        .expecting("expected `thinnest` ≤ `applied`")
    });
    Some(FillerKind::Paste {
        conductivity: conductivity?,
        yield_stress: yield_stress?,
        thinnest,
        applied,
    })
}

/// A paste of stated bond line: no pressure thins it.
fn declared(
    record: &Record,
    known: Option<&FillerRecord>,
    collector: &mut Collector,
) -> Option<FillerKind> {
    for other in ["thickness", "thinnest", "applied", "yield_stress"] {
        if record.has(other) {
            collector.report(two_ways(record, ["bond_line", other]));
            return None;
        }
    }
    let conductivity = conductivity(record, known, collector);
    let bond_line = record.number("bond_line");
    if bond_line.is_some() {
        collector.assume(
            record.at("model"),
            "paste",
            "a bond line is stated: it fills as much again where the faces part; a cured or solid one is \
             `model = \"layer\"`",
        );
    }
    Some(FillerKind::Paste {
        conductivity: conductivity?,
        // It has flowed already.
        yield_stress: 0.0,
        thinnest: bond_line?,
        applied: bond_line?,
    })
}

/// Pairs whose first value rises and is not negative, and whose second is positive.
fn rising(record: &Record, key: &str, collector: &mut Collector) -> Option<Vec<(f64, f64)>> {
    let pairs = record.pairs(key)?;
    if pairs.is_empty() {
        collector.report(
            fault(
                "file/wrong-type",
                &record.span(key),
                format!("`{key}` is empty"),
            )
            .expecting("expected at least one pair"),
        );
        return None;
    }
    let mut good = true;
    let mut last = -1.0;
    for ([first, second], span) in pairs {
        let holds = *first >= 0.0 && *first < 1e12 && *second > 0.0 && *second < 1e12;
        collector.require(holds, || {
            fault(
                "value/range",
                span,
                format!("a pair of `{key}` is beyond what it can be"),
            )
            .expecting("expected a pressure from 0 and a value above 0")
        });
        collector.require(!holds || *first > last, || {
            fault(
                "value/not-rising",
                span,
                format!("the pressures of `{key}` do not rise"),
            )
            .expecting("expected a higher pressure than before")
            .help("list the pairs from the lowest pressure to the highest, each once")
        });
        good &= holds && *first > last;
        last = last.max(*first);
    }
    good.then(|| pairs.iter().map(|([p, value], _)| (*p, *value)).collect())
}

/// Reads `[measured]`, which is for two plates: the outer option is none when it is faulty.
/// `temperature` is that of service, K.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
pub(super) fn measured(
    file: &Record,
    temperature: Option<f64>,
    collector: &mut Collector,
) -> Option<Option<Measured>> {
    if !file.has("measured") {
        return Some(None);
    }
    let record = file.record("measured")?;
    let plates = file.records("plate").len();
    collector.require(plates <= 2, || {
        fault(
            "filler/interface",
            &record.place,
            format!("in which interface of the {plates} plates was this measured?"),
        )
        .expecting("measurements stand for the one interface of two plates")
        .help("of a layer state its table of area resistance: `[[filler]] table = …`")
    });
    let kind = match (record.has("points"), record.has("law")) {
        (true, true) => {
            collector.report(two_ways(record, ["points", "law"]));
            return None;
        }
        (true, false) => MeasuredKind::Local {
            points: rising(record, "points", collector)?,
        },
        (false, true) => law(file, (record.record("law")?, temperature), collector)?,
        (false, false) => {
            let line = MEASURED
                .field("points")
                .map(crate::joint::fields::Field::line);
            collector.report(missing(record, "points", &line.unwrap_or_default()));
            return None;
        }
    };
    Some(Some(Measured {
        kind,
        factor: 1.0 + scatter(record, MEASURED_SCATTER, collector)?,
    }))
}

fn law(
    file: &Record,
    (record, service): (&Record, Option<f64>),
    collector: &mut Collector,
) -> Option<MeasuredKind> {
    let by_torque = match (record.has("force"), record.has("torque")) {
        (true, true) => {
            collector.report(two_ways(record, ["force", "torque"]));
            return None;
        }
        (false, false) => {
            let line = MEASURED_LAW
                .field("force")
                .map(crate::joint::fields::Field::line);
            collector.report(missing(record, "force", &line.unwrap_or_default()));
            return None;
        }
        (_, by_torque) => by_torque,
    };
    let exponent_key = if by_torque {
        "torque_exponent"
    } else {
        "force_exponent"
    };
    for group in file.records("fastener").iter().filter(|_| by_torque) {
        collector.require(!group.has("preload"), || {
            fault(
                "measured/no-torque",
                &record.span("torque"),
                "the law is of torque, and a fastener states its preload",
            )
            .expecting("expected a reference force")
            .help("write `force = \"1 kN\"` in the law, or state the torque of every fastener")
        });
    }
    let mut exponent = |key: &str, default: f64, why: &str| match record.number(key) {
        None if record.has(key) => None,
        None => {
            collector.assume(record.at(key), default.to_string(), why);
            Some(default)
        }
        stated => stated,
    };
    let force_exponent = exponent(exponent_key, 1.0, "not stated: in proportion to the load");
    let temperature_exponent = exponent(
        "temperature_exponent",
        0.0,
        "not stated: the same at any temperature",
    );
    let temperature = match record.number("temperature") {
        None if record.has("temperature") => None,
        None => service,
        stated => stated,
    };
    Some(MeasuredKind::ForceLaw {
        conductance: record.number("conductance")?,
        load: if by_torque {
            LawLoad::Torque(record.number("torque")?)
        } else {
            LawLoad::Force(record.number("force")?)
        },
        force_exponent: force_exponent?,
        temperature: temperature?,
        temperature_exponent: temperature_exponent?,
    })
}
