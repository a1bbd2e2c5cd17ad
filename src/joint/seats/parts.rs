//! Head and washers by name. Names are read whatever else of a bolt is faulty.

use crate::{
    catalog::{self, SeatRecord, Thread},
    diagnostic::Fault,
    joint::{
        collector::{Collector, Wording, fault},
        fields::listed,
        record::Record,
        tree::short,
        walk::missing,
    },
};

/// Kinds of head.
pub(in crate::joint) const HEADS: [&str; 5] = ["hex", "socket", "pan", "button", "countersunk"];

/// A part of the catalogue, when there is one.
type Part = Option<&'static SeatRecord>;

/// Head and washers of a bolt.
#[derive(Clone, Copy, Debug)]
pub(in crate::joint) struct Parts {
    /// The head; none when it is faulty or not stated.
    pub head: Part,
    /// Washers under head and nut; none when one is faulty.
    pub washers: Option<[Part; 2]>,
}

impl Parts {
    /// Reads the names of head and washers; where the thread is faulty they are only checked.
    pub(in crate::joint) fn read(
        record: &Record,
        thread: Option<&Thread>,
        collector: &mut Collector,
    ) -> Self {
        let head = head(record, thread, collector);
        let under_head = washer((record, "washer"), thread, collector);
        let under_nut = washer((record, "nut_washer"), thread, collector);
        Self {
            head,
            washers: under_head.zip(under_nut).map(|(head, nut)| [head, nut]),
        }
    }
}

fn head(record: &Record, thread: Option<&Thread>, collector: &mut Collector) -> Part {
    let Some(name) = record.text("head") else {
        if !record.has("head") && !record.has("bearing") {
            collector.report(missing(record, "head", "head = \"socket\"").help(
                "for example `head = \"socket\"`, or the seat itself: `bearing = \"8.5 mm\"`",
            ));
        }
        return None;
    };
    let known = catalog::seats().iter().any(|seat| {
        catalog::seat(name, &seat.thread).is_some_and(|found| HEADS.contains(&found.kind.as_str()))
    });
    if !known {
        collector.report(
            fault(
                "name/unknown",
                &record.span("head"),
                format!("no head is called `{}`", short(name)),
            )
            .expecting(format!("expected {}", listed(&HEADS)))
            .nearest(name, HEADS.into_iter()),
        );
        return None;
    }
    let thread = thread?;
    let seat = catalog::seat(name, &thread.name);
    if seat.is_none() && !record.has("bearing") {
        collector.report(no_seat(record, thread, name));
    }
    seat
}

/// A washer: the outer option is none when it is faulty, the inner one when there is none.
fn washer(
    (record, key): (&Record, &str),
    thread: Option<&Thread>,
    collector: &mut Collector,
) -> Option<Part> {
    let Some(name) = record.text(key) else {
        return (!record.has(key)).then_some(None);
    };
    if name.eq_ignore_ascii_case("none") {
        return Some(None);
    }
    let washers = || catalog::seats().iter().filter(|seat| seat.kind == "washer");
    let fits = |seat: &&SeatRecord| match thread {
        Some(thread) => catalog::seat("washer", &thread.name)
            .is_some_and(|fitting| fitting.thread == seat.thread),
        None => true,
    };
    let found = washers()
        .filter(fits)
        .find_map(|seat| catalog::seat(name, &seat.thread).filter(|found| found.kind == "washer"));
    if found.is_none() {
        let mut standards: Vec<&str> = Vec::new();
        for seat in washers().filter(fits) {
            if !standards.contains(&seat.standard.as_str()) {
                standards.push(&seat.standard);
            }
        }
        let (size, which) = match thread {
            Some(thread) => (format!(" for {}", thread.name), "known for this thread"),
            None => (String::new(), "known"),
        };
        collector.report(
            fault(
                "name/unknown",
                &record.span(key),
                format!("no washer `{}`{size}", short(name)),
            )
            .expecting("expected the standard of a washer, or `none`")
            .help(format!("{which}: {}", standards.join(", ")))
            .nearest(name, standards.iter().copied()),
        );
        return None;
    }
    Some(found)
}

/// A part that the catalogue does not have for a thread.
pub(super) fn no_seat(record: &Record, thread: &Thread, part: &str) -> Fault {
    fault(
        "fastener/no-seat",
        &record.span("thread"),
        format!("the catalogue has no `{part}` seat for {}", thread.name),
    )
    .expecting("expected `bearing` for this thread")
    .help("state the outer diameter of the seat: `bearing = \"8.5 mm\"`")
}
