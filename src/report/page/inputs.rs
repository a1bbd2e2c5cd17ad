//! Inputs of a page by who stated them: the file, the catalogue with its sources, an assumption.

use crate::{
    catalog,
    joint::{By, Joint, Stated},
    report::{
        card, catalogue,
        listing::{Item, folded},
        page::{
            Contents,
            table::{Table, numbers, words},
        },
    },
};

/// Rows of a list of places that are worth showing, characters.
const LONGEST: usize = 220;

/// Keys whose values name a record of the catalogue, with the kind of the record.
const NAMES: [(&str, &str); 13] = [
    ("material", "materials"),
    ("finish", "finishes"),
    ("plating", "platings"),
    ("thread", "threads"),
    ("grade", "grades"),
    ("head", "heads"),
    ("washer", "heads"),
    ("nut_washer", "heads"),
    ("class", "friction"),
    ("method", "methods"),
    ("medium", "gases"),
    ("filler", "fillers"),
    ("name", "fillers"),
];

/// What a record says that is no value of the joint, or that stands in its heading.
const PASSED_OVER: [&str; 8] = [
    "name", "kind", "family", "also", "status", "source", "inch", "series",
];

/// Words that an origin begins with.
const STATUSES: [&str; 5] = ["seen", "memory", "computed", "judgement", "user"];

/// The three tables: stated, from the catalogue, assumed. Those without rows are left out.
pub(super) fn tables(contents: &Contents) -> Vec<Table> {
    let tables = [stated(contents.stated), taken(contents), assumed(contents)];
    tables
        .into_iter()
        .filter(|table| !table.rows.is_empty())
        .collect()
}

fn stated(all: &[Stated]) -> Table {
    let overridden = all.iter().any(|each| each.by == By::Override);
    let mut columns = vec![words("stated"), words("value")];
    if overridden {
        columns.push(words("by"));
    }
    let mut table = Table::new("", "Stated in the joint file, values as written", columns);
    let mut group = String::new();
    for each in all {
        let (over, key) = match each.path.rsplit_once('.') {
            Some((over, key)) => (over, key),
            None => ("", each.path.as_str()),
        };
        if matches!(each.path.as_str(), "title" | "format") {
            continue;
        }
        // The first two steps name a thing; deeper ones stay with the key.
        let over = head(over);
        let key = if over.is_empty() {
            each.path.clone()
        } else {
            each.path.strip_prefix(over).map_or_else(
                || key.to_owned(),
                |rest| rest.trim_start_matches('.').to_owned(),
            )
        };
        if group != over {
            over.clone_into(&mut group);
            table.heading(group.clone());
        }
        let mut cells = vec![key, shortened(&each.value)];
        if overridden {
            cells.push(
                match each.by {
                    By::File => "file",
                    By::Override => "--set or variant",
                }
                .to_owned(),
            );
        }
        table.row(cells);
    }
    table
}

/// The table of the file that a path begins with: `plate.base`, `service`, `fastener`.
fn head(path: &str) -> &str {
    let steps = if path.starts_with("plate.") { 2 } else { 1 };
    let ends = path.match_indices('.').map(|(at, _)| at);
    let end = ends.chain([path.len()]).nth(steps - 1);
    end.map_or(path, |end| &path[..end])
}

fn shortened(value: &str) -> String {
    if value.chars().count() <= LONGEST {
        return value.to_owned();
    }
    let start: String = value.chars().take(LONGEST).collect();
    format!("{start}…")
}

/// The records of the catalogue that the file names, each once, value by value.
fn taken(contents: &Contents) -> Table {
    let mut table = Table::new(
        "",
        "Taken from the catalogue: status of every value is seen (read in its source), memory, computed or judgement",
        vec![words("value"), words("taken"), words("status and source")],
    );
    let mut told: Vec<(&str, String)> = Vec::new();
    for each in contents.stated {
        let key = each.path.rsplit('.').next().unwrap_or("");
        let Some((_, kind)) = NAMES.iter().find(|(name, _)| *name == key) else {
            continue;
        };
        // A plate or a fastener has a name of its own; a filler is named by it.
        if key == "name" && !each.path.starts_with("filler") {
            continue;
        }
        let Some(item) = record(contents.joint, kind, each) else {
            continue;
        };
        let item = &item;
        let name = match (*kind, item.cells.as_slice()) {
            // A head or a washer is told with its thread.
            ("heads", [name, thread, ..]) => format!("{name} {thread}, {}", each.value),
            (_, [name, ..]) => name.clone(),
            (_, []) => String::new(),
        };
        if told.contains(&(*kind, name.clone())) {
            continue;
        }
        told.push((*kind, name.clone()));
        let facts = card::facts(item);
        let whole = |key: &str| {
            let fact = facts.iter().find(|(label, _)| *label == key);
            fact.map(|(_, lines)| lines.join(" "))
        };
        // A record that is of one source as a whole tells it once.
        let origin = match (whole("status"), whole("source")) {
            (Some(status), Some(source)) => format!(": {status}, {source}"),
            (Some(only), None) | (None, Some(only)) => format!(": {only}"),
            (None, None) => String::new(),
        };
        table.heading(format!("{name} ({kind}){origin}"));
        for (label, lines) in facts {
            if PASSED_OVER.contains(&label) {
                continue;
            }
            let [value, origin] = match lines.as_slice() {
                [value, origin] if STATUSES.iter().any(|word| origin.starts_with(word)) => {
                    [value.clone(), origin.clone()]
                }
                lines => [lines.join("; "), String::new()],
            };
            table.row(vec![label.to_owned(), value, origin]);
        }
    }
    table
}

/// The record that a value names: the joint's own where it keeps it, so that sizes and what the file
/// itself states are those it was reckoned with.
fn record(joint: &Joint, kind: &str, stated: &Stated) -> Option<Item> {
    let group = || {
        let place = stated.path.split_once('[').and_then(|(_, rest)| {
            let (number, _) = rest.split_once(']')?;
            number.parse::<usize>().ok()?.checked_sub(1)
        });
        joint.fasteners.get(place.unwrap_or(0))
    };
    let mut listing = match kind {
        "materials" => {
            let name = folded(&stated.value);
            let material = joint
                .plates
                .iter()
                .map(|plate| &plate.material)
                .find(|material| {
                    let mut names = std::iter::once(&material.name).chain(&material.aliases);
                    names.any(|each| folded(each) == name)
                })?;
            catalogue::materials(std::slice::from_ref(material))
        }
        "threads" => catalogue::threads(std::slice::from_ref(&group()?.thread)),
        "grades" => catalogue::grades(std::slice::from_ref(&group()?.grade)),
        "heads" => {
            let seat = catalog::seat(&stated.value, &group()?.thread.name)?;
            catalogue::heads(std::slice::from_ref(seat))
        }
        _ => {
            let mut all = catalogue::listings();
            let place = all.iter().position(|listing| listing.kind == kind)?;
            let mut listing = all.swap_remove(place);
            listing.items.retain(|item| is_called(item, &stated.value));
            listing
        }
    };
    (!listing.items.is_empty()).then(|| listing.items.swap_remove(0))
}

/// Whether a record answers to a name.
fn is_called(item: &Item, name: &str) -> bool {
    let name = folded(name);
    let own = item.cells.first().map(|cell| folded(cell));
    own.as_ref() == Some(&name) || item.keywords.split('|').any(|word| folded(word) == name)
}

fn assumed(contents: &Contents) -> Table {
    let mut table = Table::new(
        "",
        "Assumed, because the file does not state it",
        vec![words("field"), words("taken"), words("why")],
    );
    for each in &contents.estimate.assumptions {
        table.row(vec![
            each.field.clone(),
            each.value.clone(),
            each.why.clone(),
        ]);
    }
    table
}

/// The bolts with their places and what they bear, at the first case.
pub(super) fn bolts(contents: &Contents) -> Table {
    use crate::report::number::{band, optional, percent};
    let mut table = Table::new(
        "",
        "Bolts: place, clamp force at assembly and in service, share of the yield strength",
        vec![
            words("bolt"),
            numbers("x", "mm"),
            numbers("y", "mm"),
            numbers("assembly", "least kN"),
            numbers("assembly", "nominal kN"),
            numbers("assembly", "most kN"),
            numbers("service", "least kN"),
            numbers("service", "nominal kN"),
            numbers("service", "most kN"),
            numbers("of yield", "nominal"),
            numbers("of yield", "highest"),
            numbers("torque at most", "N·m"),
        ],
    );
    let Some(case) = contents.estimate.cases.first() else {
        return table;
    };
    for (index, bolt) in case.bolts.iter().enumerate() {
        let mut cells = vec![(index + 1).to_string()];
        cells.extend(bolt.at.map(|at| crate::report::number::brief(at * 1e3)));
        if bolt.missing {
            cells.extend(std::iter::repeat_n("–".to_owned(), 9));
        } else {
            cells.extend(band(&bolt.force, 1e3));
            cells.extend(band(&bolt.force_in_service, 1e3));
            let share = |which: usize| {
                bolt.strength_use
                    .map_or_else(|| "–".to_owned(), |each| percent(each[which]))
            };
            cells.extend([share(0), share(1), optional(bolt.largest_torque)]);
        }
        table.row(cells);
    }
    table
}
