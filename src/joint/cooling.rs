//! Where heat leaves the last plate: the whole back, parts of it, edges, and a back that radiates.

mod balance;

use crate::joint::{
    CooledPart, Cooling, Edge, Outline, Sink, Zone,
    collector::{Collector, Wording, fault},
    heating::inside,
    plates::{PlateDraft, two_ways},
    record::Record,
    tree::Span,
    walk::missing,
};

pub(super) use balance::Radiating;

/// Keys of which one says how a part is cooled.
const WAYS: [&str; 5] = ["film", "temperature", "face", "edge", "radiation"];

/// Temperatures that a text of another unit may differ by, K.
const ROUNDING: f64 = 1e-6;

/// What the cooled back says of its own temperature.
#[derive(Debug)]
pub(super) struct Back {
    /// The stated temperature with its place.
    pub temperature: Option<(f64, Span)>,
    /// How it radiates.
    pub radiating: Option<Radiating>,
}

/// Reads what the back says of its own temperature; none when it says nothing or a faulty thing.
pub(super) fn back(last: &PlateDraft, collector: &mut Collector) -> Option<Back> {
    let records = last.record.records("cooled");
    let mut temperature: Option<(f64, Span)> = None;
    for record in records.iter().filter(|record| record.has("temperature")) {
        let (value, span) = (record.number("temperature")?, record.span("temperature"));
        let agrees = temperature
            .as_ref()
            .is_none_or(|(first, _)| (first - value).abs() < ROUNDING);
        collector.require(agrees, || {
            fault(
                "file/conflict",
                &span,
                "parts of one sink have two temperatures",
            )
            .expecting("expected one for all")
            .help("results stand above one reference: all parts are cooled to one temperature")
        });
        temperature.get_or_insert((value, span));
    }
    Some(Back {
        temperature,
        radiating: balance::read(last, collector),
    })
}

/// Reads where heat leaves the last plate.
pub(super) fn read(last: &PlateDraft, collector: &mut Collector) -> Option<Cooling> {
    let records = last.record.records("cooled");
    if records.is_empty() {
        if last.record.has("cooled") {
            return None;
        }
        collector.assume(
            last.record.at("cooled"),
            "the whole back at one temperature",
            "not stated; a film or an edge changes what the joint adds",
        );
        return Some(Cooling::Whole(Sink::IsothermalBack));
    }
    let read: Vec<Option<Vec<CooledPart>>> = records
        .iter()
        .map(|record| parts(record, last, collector))
        .collect();
    let parts: Vec<CooledPart> = read
        .into_iter()
        .collect::<Option<Vec<_>>>()?
        .into_iter()
        .flatten()
        .collect();
    Some(match parts.as_slice() {
        [CooledPart::Held(Zone::Face)] => Cooling::Whole(Sink::IsothermalBack),
        [
            CooledPart::Film {
                zone: Zone::Face,
                coefficient,
            },
        ] => Cooling::Whole(Sink::Film(*coefficient)),
        [CooledPart::Rim] => Cooling::Whole(Sink::Rim),
        _ => {
            radiates_among(&parts, records, collector);
            Cooling::Parts(parts)
        }
    })
}

/// Radiation has a balance only where everything else acts on the whole back too.
fn radiates_among(parts: &[CooledPart], records: &[Record], collector: &mut Collector) {
    let whole = |part: &CooledPart| {
        matches!(
            part,
            CooledPart::Radiation { .. }
                | CooledPart::Film {
                    zone: Zone::Face,
                    ..
                }
        )
    };
    let mut radiating = records.iter().filter(|record| record.has("radiation"));
    let (Some(first), second) = (radiating.next(), radiating.next()) else {
        return;
    };
    for film in records {
        collector.require(film.stated_spread("film").is_none(), || {
            fault(
                "file/conflict",
                &film.span("film"),
                "a film with a spread stands beside a radiating back",
            )
            .expecting("expected a film without a spread")
            .help(
                "the temperature of the sink surface follows from the balance of both and is one number: state each \
                 end of the film in a file of its own, or a [[variant]]",
            )
        });
    }
    let place = second.unwrap_or(first).span("radiation");
    collector.require(second.is_none() && parts.iter().all(whole), || {
        fault(
            "file/conflict",
            &place,
            "a radiating back stands beside other sinks than a film on the whole back",
        )
        .expecting("expected alone, or beside films on the whole back")
        .help(
            "what leaves by the edges or zones is not known beforehand, so that no balance gives the radiation: \
             state it as a film of your own, `film = \"5 W/(m²·K)\"`",
        )
    });
}

/// The parts that one table states.
fn parts(record: &Record, last: &PlateDraft, collector: &mut Collector) -> Option<Vec<CooledPart>> {
    let stated: Vec<&str> = WAYS.into_iter().filter(|key| record.has(key)).collect();
    let whole = ["edge", "radiation"]
        .into_iter()
        .find(|key| record.has(key));
    let zone = ["size", "diameter", "centre"]
        .into_iter()
        .find(|key| record.has(key));
    if let (Some(whole), Some(zone)) = (whole, zone) {
        let help = if whole == "edge" {
            "an edge is cooled over its whole length"
        } else {
            "the whole back radiates"
        };
        collector.report(two_ways(record, [whole, zone]).help(help));
        return None;
    }
    match stated.as_slice() {
        ["film"] => {
            let zone = inside(record, ("cooled", last), collector);
            Some(vec![CooledPart::Film {
                coefficient: record.number("film")?,
                zone: zone?,
            }])
        }
        ["temperature" | "face"] | ["temperature", "face"] => {
            let zone = inside(record, ("cooled", last), collector)?;
            Some(vec![CooledPart::Held(zone)])
        }
        ["edge"] | ["temperature", "edge"] => edges(record, last, collector),
        ["radiation"] => {
            let emissivity = record.record("radiation")?.number("emissivity")?;
            Some(vec![CooledPart::Radiation { emissivity }])
        }
        [] => {
            collector.report(missing(record, "film", "film = \"500 W/(m²·K)\""));
            None
        }
        [first, .., last] => {
            collector.report(two_ways(record, [first, last]));
            None
        }
        [_] => None,
    }
}

fn edges(record: &Record, last: &PlateDraft, collector: &mut Collector) -> Option<Vec<CooledPart>> {
    let words = record.words("edge")?;
    let outline = last.outline.as_ref()?;
    let round = matches!(outline, Outline::Disc { .. });
    let rim = words.iter().any(|word| word == "rim");
    if rim && !round {
        collector.report(
            fault(
                "plate/not-round",
                &record.span("edge"),
                format!("plate `{}` has no rim: it is not round", last.name),
            )
            .expecting("expected a plate with a `diameter`")
            .help(
                "a rectangular plate has edges: `edge = \"left\"`, `[\"left\", \"right\"]` or `\"all\"`; or cool the \
                 back: `cooled = { film = \"500 W/(m²·K)\" }`",
            ),
        );
        return None;
    }
    let straight = words.iter().any(|word| word != "rim");
    if straight && !matches!(outline, Outline::Rectangle { .. }) {
        let help = if round {
            "a round plate is cooled at its rim: `edge = \"rim\"`"
        } else {
            "of an outline cool a zone of the back: `cooled = { film = \"500 W/(m²·K)\", centre = …, size = … }`"
        };
        collector.report(
            fault(
                "plate/no-such-edge",
                &record.span("edge"),
                format!("plate `{}` has no straight edges to cool", last.name),
            )
            .expecting("expected a plate with a `size`")
            .help(help),
        );
        return None;
    }
    if rim {
        return Some(vec![CooledPart::Rim]);
    }
    let named = [
        ("left", Edge::Left),
        ("right", Edge::Right),
        ("lower", Edge::Lower),
        ("upper", Edge::Upper),
    ];
    let wanted = named
        .into_iter()
        .filter(|(name, _)| words.iter().any(|word| word == name || word == "all"));
    Some(wanted.map(|(_, edge)| CooledPart::Edge(edge)).collect())
}
