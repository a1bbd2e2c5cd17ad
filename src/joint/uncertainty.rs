//! How inputs scatter together, and which values carry a spread of their own.

use crate::joint::{Bolts, Bounds, Facing, Uncertain, What, collector::Collector, record::Record};

/// Reads whether the bolts scatter alike; none when it is faulty.
pub(super) fn bolts(file: &Record, collector: &mut Collector) -> Option<Bolts> {
    let absent = Record::absent("uncertainty", &(0..0));
    let record = match file.record("uncertainty") {
        Some(record) => record,
        None if file.has("uncertainty") => return None,
        None => &absent,
    };
    match (record.text("bolts"), record.number("bolts")) {
        (Some("independent"), _) => Some(Bolts::INDEPENDENT),
        (Some(_), _) => Some(Bolts::ONE_LOT),
        (None, Some(own)) => Some(Bolts { own }),
        (None, None) if record.has("bolts") => None,
        (None, None) => {
            collector.assume(
                record.at("bolts"),
                "one lot",
                "not stated: friction of all bolts lies alike, which does not average out",
            );
            Some(Bolts::ONE_LOT)
        }
    }
}

/// A value of the filler of an interface.
type Named = fn(usize) -> What;

/// Values that are stated with a spread of their own, in the order of the file's parts: fillers, plates,
/// sink, gas.
pub(super) fn stated(file: &Record, plates: &[String]) -> Vec<Uncertain> {
    let mut found = Vec::new();
    for record in file.records("filler") {
        let interface = match record.names("between") {
            None => Some(0),
            Some([one, other]) => {
                let place = |name: &str| plates.iter().position(|plate| plate == name);
                place(&one.0).zip(place(&other.0)).map(|(a, b)| a.min(b))
            }
        };
        let Some(interface) = interface else { continue };
        let keys: [(&str, Named); 6] = [
            ("conductivity", What::FillerConductivity),
            ("thickness", What::FillerThickness),
            ("bond_line", What::FillerThickness),
            ("applied", What::FillerThickness),
            ("thinnest", What::FillerThinnest),
            ("boundary", What::FillerBoundary),
        ];
        for (key, what) in keys {
            found.extend(record.stated_spread(key).map(|bounds| Uncertain {
                what: what(interface),
                bounds,
            }));
        }
    }
    let mut take = |bounds: Option<Bounds>, what: What| {
        found.extend(bounds.map(|bounds| Uncertain { what, bounds }));
    };
    for (index, plate) in file.records("plate").iter().enumerate() {
        take(plate.stated_spread("emissivity"), What::Emissivity(index));
        take(plate.stated_spread("thickness"), What::Thickness(index));
        let bow = plate.record("bow");
        take(
            bow.and_then(|bow| bow.stated_spread("height")),
            What::Bow(index),
        );
        // Beside a known shape the height of the tolerance says nothing.
        if bow.is_some() || plate.has("flatness_map") {
            continue;
        }
        let of = |key: &str| plate.record(key)?.stated_spread("flatness");
        let between = index > 0 && index + 1 < plates.len();
        let facing = if index == 0 {
            Facing::Cold
        } else {
            Facing::Warm
        };
        take(of("finish"), What::Flatness(index, facing));
        if between {
            // Both faces of a plate between others are as its finish says unless one is stated apart.
            let below = if plate.has("finish_below") {
                "finish_below"
            } else {
                "finish"
            };
            take(of(below), What::Flatness(index, Facing::Cold));
        }
    }
    let cooled = file
        .records("plate")
        .last()
        .map(|last| last.records("cooled"));
    let films = cooled
        .into_iter()
        .flatten()
        .filter(|part| part.has("film"))
        .enumerate();
    for (number, part) in films {
        take(part.stated_spread("film"), What::Film(number));
    }
    let service = file.record("service");
    take(
        service.and_then(|service| service.stated_spread("pressure")),
        What::GasPressure,
    );
    take(
        service.and_then(|service| service.stated_spread("heat")),
        What::Heat,
    );
    found
}
