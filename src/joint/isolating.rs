//! Isolating washers of a bolt.

use crate::joint::{
    Engagement, Isolating,
    collector::{Collector, Wording, fault},
    materials::{self, Own},
    record::Record,
};

/// Reads the isolating washers of a fastener: the outer option is none when they are faulty, the
/// inner one when there are none.
#[expect(clippy::option_option, reason = "faulty and not stated are two things")]
pub(super) fn read(
    fastener: &Record,
    (engagement, own): (Option<Engagement>, &Own),
    collector: &mut Collector,
) -> Option<Option<Isolating>> {
    if !fastener.has("isolating") {
        return Some(None);
    }
    let record = fastener.record("isolating")?;
    let material = materials::of_plate(record, own, collector);
    let thickness = record.number("thickness");
    let engagement = engagement?;
    let has_nut = matches!(engagement, Engagement::Nut);
    let under = match record.text("under") {
        Some(under) => under,
        None if record.has("under") => return None,
        None => {
            let under = if has_nut { "both" } else { "head" };
            collector.assume(
                record.at("under"),
                under,
                "not stated; one left out would leave its end of the bolt in the heat",
            );
            under
        }
    };
    if under != "head" && !has_nut {
        collector.report(
            fault(
                "file/conflict",
                &record.span("under"),
                "an isolating washer lies under a nut that is not there",
            )
            .expecting("expected `head`")
            .help("a thread in the plate gives its heat to the plate: only a washer under the head isolates"),
        );
        return None;
    }
    Some(Some(Isolating {
        material: material?,
        thickness: thickness?,
        count: if under == "both" { 2 } else { 1 },
    }))
}
