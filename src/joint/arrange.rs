//! What a search of layouts may try, read from `[arrange]`.

use crate::joint::{
    Arrange, Family, Symmetry, Zone,
    collector::{Collector, Wording, fault},
    plates::two_ways,
    record::Record,
    walk::missing,
};

/// Most bolts that a search places.
const MOST_BOLTS: usize = 60;

/// Reads `[arrange]`; the outer none when it is faulty, the inner when the file has none.
#[expect(
    clippy::option_option,
    reason = "a faulty table and none are two things"
)]
pub(super) fn read(file: &Record, collector: &mut Collector) -> Option<Option<Arrange>> {
    let Some(record) = file.record("arrange") else {
        return (!file.has("arrange")).then_some(None);
    };
    let before = collector.count();
    let plain = Arrange::default();
    let families = record.words("families").map_or(plain.families, |words| {
        let named = words.iter().filter_map(|word| Family::named(word));
        let mut families: Vec<Family> = named.collect();
        families.sort();
        families.dedup();
        families
    });
    let symmetry = record.text("symmetry").and_then(Symmetry::named);
    let bolts = bolts(record, collector);
    let keep_out = record
        .records("keep_out")
        .iter()
        .filter_map(|zone| keep_out(zone, collector))
        .collect();
    let stated = record.entries.iter().all(|entry| entry.value.is_some());
    (stated && collector.count() == before).then(|| {
        Some(Arrange {
            families,
            bolts: bolts.unwrap_or(plain.bolts),
            symmetry: symmetry.unwrap_or(plain.symmetry),
            edge_distance: record.number("edge_distance"),
            pitch: record.number("pitch"),
            step: record.number("step"),
            keep_out,
            sizes: record.records("sizes").len(),
        })
    })
}

/// Fewest and most bolts.
fn bolts(record: &Record, collector: &mut Collector) -> Option<[usize; 2]> {
    let bolts = match *record.counts("bolts")? {
        [one] => [one, one],
        [fewest, most] => [fewest, most],
        _ => return None,
    };
    let fits = 1 <= bolts[0] && bolts[0] <= bolts[1] && bolts[1] <= MOST_BOLTS;
    collector.require(fits, || {
        fault(
            "arrange/bolts",
            &record.span("bolts"),
            format!("from {} to {} bolts cannot be tried", bolts[0], bolts[1]),
        )
        .expecting(format!(
            "expected fewest and most, 1 to {MOST_BOLTS}, such as `[4, 12]`"
        ))
    });
    fits.then_some(bolts)
}

fn keep_out(record: &Record, collector: &mut Collector) -> Option<Zone> {
    match (record.has("size"), record.has("diameter")) {
        (true, true) => {
            collector.report(two_ways(record, ["size", "diameter"]));
            None
        }
        (true, false) => Some(Zone::Rectangle {
            centre: record.point("centre")?,
            size: record.point("size")?,
        }),
        (false, true) => Some(Zone::Disc {
            centre: record.point("centre")?,
            radius: record.number("diameter")? / 2.0,
        }),
        (false, false) => {
            collector.report(missing(record, "size", "size = [\"20 mm\", \"10 mm\"]"));
            None
        }
    }
}
