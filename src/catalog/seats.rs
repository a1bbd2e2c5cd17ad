//! Heads, nuts and washers as seats, from `seats.toml`; clearance holes, from `holes.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    names::plain,
    raw::{CatalogFault, Origin, RawOrigin, RawStatus, Sources, embedded, parse},
    records::{ClearanceHole, SeatRecord},
    threads::{size, thread},
};

/// All heads, nuts and washers.
pub fn seats() -> &'static [SeatRecord] {
    &rack().seats
}

/// A seat by kind (`hex`, `socket`, `pan`, `button`, `countersunk`, `nut`, `washer`), by another
/// name of it (`hexagon`) or by a standard that means one kind (`ISO 7089`), for a thread by designation (`M10x1.25`) or size (`1/4`).
pub fn seat(kind: &str, thread_name: &str) -> Option<&'static SeatRecord> {
    let rack = rack();
    let size = size_of(thread_name);
    let kind = plain(kind);
    rack.groups
        .iter()
        .filter(|group| group.names.contains(&kind))
        .flat_map(|group| &rack.seats[group.places.clone()])
        .find(|seat| plain(&seat.thread) == size)
}

/// Every kind, alias and standard that [`seat`] knows.
pub fn seat_names() -> impl Iterator<Item = &'static str> {
    rack().groups.iter().flat_map(|group| {
        std::iter::once(group.kind.as_str()).chain(group.aliases.iter().map(String::as_str))
    })
}

/// All clearance holes.
pub fn clearance_holes() -> &'static [ClearanceHole] {
    static HOLES: OnceLock<Vec<ClearanceHole>> = OnceLock::new();
    HOLES.get_or_init(|| embedded(read_holes(include_str!("holes.toml"))))
}

/// Clearance holes of a thread by designation or size.
pub fn clearance_hole(thread_name: &str) -> Option<&'static ClearanceHole> {
    let size = size_of(thread_name);
    clearance_holes()
        .iter()
        .find(|hole| plain(&hole.thread) == size)
}

/// The size a name stands for; a name that is no thread counts as a size itself.
fn size_of(thread_name: &str) -> String {
    thread(thread_name).map_or_else(|| plain(thread_name), |thread| plain(size(thread)))
}

struct Group {
    kind: String,
    aliases: Vec<String>,
    names: Vec<String>,
    places: std::ops::Range<usize>,
}

pub(super) struct Rack {
    seats: Vec<SeatRecord>,
    groups: Vec<Group>,
}

fn rack() -> &'static Rack {
    static RACK: OnceLock<Rack> = OnceLock::new();
    RACK.get_or_init(|| embedded(read(include_str!("seats.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    group: Vec<RawGroup>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawGroup {
    kind: String,
    aliases: Vec<String>,
    standard: String,
    status: RawStatus,
    source: String,
    of: Option<String>,
    seats: Vec<RawSeat>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawSeat {
    thread: String,
    outer_mm: f64,
    inner_mm: Option<f64>,
    height_mm: Option<f64>,
    status: Option<RawStatus>,
    of: Option<String>,
}

pub(super) fn read(text: &str) -> Result<Rack, CatalogFault> {
    let file: File = parse("seats.toml", text)?;
    let mut rack = Rack {
        seats: Vec::new(),
        groups: Vec::new(),
    };
    for raw in &file.group {
        let first = rack.seats.len();
        for seat in &raw.seats {
            let seat = checked(seat, raw, &file.sources)?;
            let again = |other: &SeatRecord| other.kind == seat.kind && other.thread == seat.thread;
            if rack.seats.iter().any(again) {
                let what = format!("two {} seats for {}", seat.kind, seat.thread);
                return Err(CatalogFault::new(&raw.standard, what));
            }
            rack.seats.push(seat);
        }
        let group = Group {
            kind: raw.kind.clone(),
            aliases: raw.aliases.clone(),
            names: std::iter::once(&raw.kind)
                .chain(&raw.aliases)
                .map(|name| plain(name))
                .collect(),
            places: first..rack.seats.len(),
        };
        refuse_ambiguous(&group, &rack.groups)?;
        rack.groups.push(group);
    }
    Ok(rack)
}

/// One name means one kind, and no group has it twice.
fn refuse_ambiguous(group: &Group, others: &[Group]) -> Result<(), CatalogFault> {
    let names = &group.names;
    let twice = (1..names.len()).any(|n| names[..n].contains(&names[n]));
    let clash = others.iter().any(|other| {
        other.kind != group.kind && other.names.iter().any(|name| group.names.contains(name))
    });
    if twice || clash {
        let what = "a name is given twice or stands for two kinds";
        return Err(CatalogFault::new(&group.kind, what));
    }
    Ok(())
}

fn checked(raw: &RawSeat, group: &RawGroup, sources: &Sources) -> Result<SeatRecord, CatalogFault> {
    let place = format!("{} {}", group.standard, raw.thread);
    let inner = raw.inner_mm.unwrap_or(raw.outer_mm / 2.0);
    let height = raw.height_mm.unwrap_or(1.0);
    if !(0.0 < inner && inner < raw.outer_mm && raw.outer_mm.is_finite() && 0.0 < height) {
        return Err(CatalogFault::new(
            &place,
            "0 < inner < outer and 0 < height must hold",
        ));
    }
    let origin = row_origin(
        (group.status, &group.source, group.of.as_deref()),
        (raw.status, raw.of.as_deref()),
        sources,
    )?;
    Ok(SeatRecord {
        kind: group.kind.clone(),
        standard: group.standard.clone(),
        thread: raw.thread.clone(),
        outer: raw.outer_mm * 1e-3,
        inner: raw.inner_mm.map(|inner| inner * 1e-3),
        height: raw.height_mm.map(|height| height * 1e-3),
        status: origin.status,
        source: origin.source,
    })
}

/// The origin of a row: that of its group unless the row says otherwise.
fn row_origin(
    (status, source, of): (RawStatus, &str, Option<&str>),
    (row_status, row_of): (Option<RawStatus>, Option<&str>),
    sources: &Sources,
) -> Result<Origin, CatalogFault> {
    let from_memory = matches!(row_status, Some(RawStatus::Memory)).then_some("from memory");
    sources.origin(&RawOrigin {
        status: row_status.unwrap_or(status),
        source: source.to_owned(),
        of: row_of.or(from_memory).or(of).map(str::to_owned),
    })
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct HoleFile {
    sources: Sources,
    group: Vec<RawHoleGroup>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawHoleGroup {
    standard: String,
    status: RawStatus,
    source: String,
    holes: Vec<RawHole>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawHole {
    thread: String,
    diameters_mm: [f64; 3],
    status: Option<RawStatus>,
    of: Option<String>,
}

pub(super) fn read_holes(text: &str) -> Result<Vec<ClearanceHole>, CatalogFault> {
    let file: HoleFile = parse("holes.toml", text)?;
    let mut holes = Vec::<ClearanceHole>::new();
    for group in &file.group {
        for raw in &group.holes {
            let [fine, medium, coarse] = raw.diameters_mm;
            let twice = holes.iter().any(|hole| hole.thread == raw.thread);
            if twice || !(0.0 < fine && fine < medium && medium < coarse) {
                let what = "0 < fine < medium < coarse, once for each size, must hold";
                return Err(CatalogFault::new(&raw.thread, what));
            }
            let origin = row_origin(
                (group.status, &group.source, None),
                (raw.status, raw.of.as_deref()),
                &file.sources,
            )?;
            holes.push(ClearanceHole {
                standard: group.standard.clone(),
                thread: raw.thread.clone(),
                diameters: raw.diameters_mm.map(|diameter| diameter * 1e-3),
                status: origin.status,
                source: origin.source,
            });
        }
    }
    Ok(holes)
}
