//! Whether the plates of a file make a stack: which key belongs to which plate, what lies on what.

use crate::joint::{
    collector::{Collector, Wording, fault},
    geometry::overlap,
    materials::duplicate,
    plates::PlateDraft,
    record::Record,
    sandwich,
    tree::Span,
};

/// Refuses keys that belong to another plate, feet that would face feet, and names given twice.
pub(super) fn check(records: &[Record], drafts: &[PlateDraft], collector: &mut Collector) {
    let last = records.len() - 1;
    if let [first, second] = records
        && first.has("feet")
        && second.has("feet")
    {
        collector.report(
            fault("plate/feet", &second.span("feet"), "both plates have feet")
                .expecting("expected feet on one of the two")
                .help(
                    "feet stand on the plain face of the other plate: state them on one side only",
                ),
        );
    }
    for (index, draft) in drafts.iter().enumerate() {
        if drafts[..index].iter().any(|other| other.name == draft.name) {
            collector.report(duplicate("plate", &draft.name, &draft.record.span("name")));
        }
    }
    let below = if last > 1 {
        "plate below"
    } else {
        "second plate"
    };
    let sink = if last > 1 {
        "last plate"
    } else {
        "second plate"
    };
    for (index, record) in records.iter().enumerate() {
        if index == 0 {
            misplaced(record, ("offset", below), collector);
        }
        if index > 0 {
            misplaced(record, ("heated", "first plate"), collector);
        }
        if index < last {
            misplaced(record, ("cooled", sink), collector);
        }
        if index == 0 || index == last {
            outside(record, collector);
        } else {
            between(record, collector);
        }
    }
}

fn misplaced(record: &Record, (key, owner): (&str, &str), collector: &mut Collector) {
    if !record.has(key) {
        return;
    }
    let told = fault(
        "plate/misplaced",
        &record.span(key),
        format!("`{key}` belongs to the {owner}"),
    );
    let word = owner.split(' ').next().unwrap_or(owner);
    collector.report(if owner == "plate below" {
        told.expecting("expected in the next [[plate]]")
            .help("`offset` says where the plate above lies on this one; the first lies under none")
    } else if owner == "last plate" {
        told.expecting("expected in the last [[plate]]")
            .help("plates stand from warm to cold: heat enters the first and leaves the last")
    } else {
        told.expecting(format!("expected in the {word} [[plate]]")).help(
            "the warm plate comes first: it is heated, and it lies on the second, which is cooled",
        )
    });
}

/// The first and the last plate have one faying face.
fn outside(record: &Record, collector: &mut Collector) {
    if record.has("finish_below") {
        collector.report(
            fault(
                "plate/misplaced",
                &record.span("finish_below"),
                "`finish_below` belongs to a plate between others",
            )
            .expecting("this plate has one faying face")
            .help("state it as `finish`"),
        );
    }
}

/// A plate between others has no outer face, and both its faces lie on neighbours.
fn between(record: &Record, collector: &mut Collector) {
    sandwich::between(record, collector);
    let mut refuse = |span: Span, key: &str, why: &str| {
        collector.report(
            fault(
                "plate/misplaced",
                &span,
                format!("`{key}` belongs to the first or the last plate"),
            )
            .expecting("this plate lies between others")
            .help(why),
        );
    };
    for (key, why) in [
        (
            "feet",
            "it has two faying faces, and feet are stated for the only one; put them on the plate that faces it",
        ),
        ("ribs", "ribs stand on the outer face, which it has not"),
        (
            "flatness_map",
            "it has two faying faces; state a `bow` of the whole plate, or the `flatness` of each face",
        ),
    ] {
        if record.has(key) {
            refuse(record.span(key), key, why);
        }
    }
    if let Some(sag) = record.record("sag")
        && sag.has("bimetal")
    {
        refuse(
            sag.span("bimetal"),
            "bimetal",
            "the second layer lies on the outer face, which it has not; state the `curvature`",
        );
    }
}

/// Where the origins of all plates lie in the coordinates of the first, m.
pub(super) fn place(drafts: &mut [PlateDraft], collector: &mut Collector) {
    if let Some(first) = drafts.first_mut() {
        first.origin = Some([0.0, 0.0]);
    }
    for below in 1..drafts.len() {
        let (above, rest) = drafts.split_at_mut(below);
        let (above, below) = (&above[below - 1], &mut rest[0]);
        let from_above = origin_below(above, below, collector);
        below.origin = above.origin.zip(from_above).map(|(origin, from)| {
            if origin == [0.0, 0.0] {
                from
            } else {
                [origin[0] + from[0], origin[1] + from[1]]
            }
        });
        if let (Some(one), Some(other)) = (above.placed(), below.placed())
            && !overlap(one, other)
        {
            collector.report(
                fault(
                    "plate/no-overlap",
                    &below.record.span("offset"),
                    "the plates do not lie on each other",
                )
                .expecting("expected a place on this plate")
                .help("`offset` is where the corner (round: the centre; outline: the origin of its points) of the first plate lies on the second"),
            );
            // Without a place for it, no hole is told to lie beside this plate.
            below.origin = None;
        }
    }
}

/// Where the origin of a plate lies from that of the plate on it, m.
fn origin_below(
    upper: &PlateDraft,
    lower: &PlateDraft,
    collector: &mut Collector,
) -> Option<[f64; 2]> {
    if let Some(offset) = lower.record.point("offset") {
        return Some([0.0 - offset[0], 0.0 - offset[1]]);
    }
    if lower.record.has("offset") {
        return None;
    }
    let (above, below) = (upper.outline.as_ref()?, lower.outline.as_ref()?);
    if above != below {
        collector.assume(
            lower.record.at("offset"),
            "centred",
            "the plates differ in outline and no offset is stated",
        );
    }
    let (centre, own) = (above.centre(), below.centre());
    Some([centre[0] - own[0], centre[1] - own[1]])
}
