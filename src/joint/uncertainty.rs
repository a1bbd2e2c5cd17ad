//! How inputs scatter together, and which values carry a spread of their own.

use crate::joint::{Bolts, Uncertain, What, collector::Collector, record::Record};

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

/// Values of fillers and faces that are stated with a spread, in the order of the file's parts.
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
    for (index, plate) in file.records("plate").iter().enumerate() {
        found.extend(plate.stated_spread("emissivity").map(|bounds| Uncertain {
            what: What::Emissivity(index),
            bounds,
        }));
    }
    found
}
