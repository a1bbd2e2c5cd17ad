//! The catalogue as tables for people, and the names of each kind.

mod cells;
mod fasteners;
mod surfaces;

use crate::catalog::{
    fillers::fillers, finishes::finishes, friction::friction, gases::gases, grades::grades,
    materials::materials, methods::methods, platings::platings, seats::seat_names,
    threads::threads,
};

/// A kind of record.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Plate materials.
    Materials,
    /// Surface finishes by process.
    Finishes,
    /// Threads with their clearance holes.
    Threads,
    /// Heads, nuts and washers.
    Heads,
    /// Bolt grades.
    Grades,
    /// Friction classes, pairs and nut factors.
    Friction,
    /// Tightening methods.
    Tightening,
    /// Gases.
    Gases,
    /// Fillers.
    Fillers,
    /// Platings and films.
    Platings,
}

impl Kind {
    /// Every kind, in the order of the chain.
    pub const ALL: [Self; 10] = [
        Self::Materials,
        Self::Finishes,
        Self::Threads,
        Self::Heads,
        Self::Grades,
        Self::Friction,
        Self::Tightening,
        Self::Gases,
        Self::Fillers,
        Self::Platings,
    ];
}

/// A table for people; the last two columns are status and source.
#[derive(Clone, Debug, PartialEq)]
pub struct Table {
    /// Headings with their units.
    pub columns: Vec<&'static str>,
    /// Rows, each as long as the headings.
    pub rows: Vec<Vec<String>>,
}

/// The records of a kind as a table.
///
/// Where the values of a record differ in origin, the status tells them apart
/// (`seen; memory: H`) and the sources stand one after the other.
pub fn table(kind: Kind) -> Table {
    match kind {
        Kind::Materials => surfaces::materials_table(),
        Kind::Finishes => surfaces::finishes_table(),
        Kind::Threads => fasteners::threads_table(),
        Kind::Heads => fasteners::heads_table(),
        Kind::Grades => fasteners::grades_table(),
        Kind::Friction => fasteners::friction_table(),
        Kind::Tightening => fasteners::tightening_table(),
        Kind::Gases => surfaces::gases_table(),
        Kind::Fillers => surfaces::fillers_table(),
        Kind::Platings => surfaces::platings_table(),
    }
}

/// Every name and alias of a kind, to suggest the nearest of.
pub fn names(kind: Kind) -> Vec<&'static str> {
    fn all<T>(
        records: &'static [T],
        names: impl Fn(&'static T) -> (&'static String, &'static [String]),
    ) -> Vec<&'static str> {
        let names = records.iter().map(names);
        names
            .flat_map(|(name, aliases)| std::iter::once(name).chain(aliases))
            .map(String::as_str)
            .collect()
    }
    match kind {
        Kind::Materials => all(materials(), |r| (&r.name, &r.aliases)),
        Kind::Finishes => all(finishes(), |r| (&r.name, &r.aliases)),
        Kind::Threads => all(threads(), |r| (&r.name, &[])),
        Kind::Heads => seat_names().collect(),
        Kind::Grades => all(grades(), |r| (&r.name, &[])),
        Kind::Friction => all(friction(), |r| (&r.name, &[])),
        Kind::Tightening => all(methods(), |r| (&r.name, &[])),
        Kind::Gases => all(gases(), |r| (&r.name, &[])),
        Kind::Fillers => all(fillers(), |r| (&r.name, &r.aliases)),
        Kind::Platings => all(platings(), |r| (&r.name, &r.aliases)),
    }
}
