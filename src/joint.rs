//! The joint file, and the checked joint it describes.
//!
//! Text becomes a tree with places, overrides change the tree, one description of the fields
//! reads it into SI values, and the parts below turn these into a checked [`Joint`]. Every fault
//! is told at once, in file order.

pub mod checked;
pub mod fields;
pub mod sections;

mod arrange;
mod beyond_cone;
mod cold;
mod collector;
mod contact;
mod cooling;
mod fasteners;
mod filler;
mod finishes;
mod gaps;
mod geometry;
mod heating;
mod inserts;
mod isolating;
mod lands;
mod limits;
mod loads;
mod maps;
mod mass;
mod materials;
mod medium;
mod missing;
mod overrides;
mod patches;
mod patterns;
mod plates;
mod radiation;
mod record;
mod sag;
mod sandwich;
mod schema;
mod seats;
mod service;
mod stack;
mod stacking;
mod stated;
mod symmetry;
mod syntax;
mod tightening;
mod tree;
mod uncertainty;
mod variants;
mod versions;
mod walk;
mod zones;

use toml::de::DeTable;

use crate::{
    diagnostic::{self, Colour, Fault},
    joint::{
        collector::{Collector, Wording, fault},
        maps::Tables,
        record::Record,
        sections::{FILE, FORMAT},
        tree::Node,
    },
};

pub use checked::*;
pub use finishes::{peak_to_valley, slope_from_roughness};
pub use maps::{Files, LONGEST_TABLE, read_flatness};
pub use mass::Mass;
pub use missing::NotLeftOut;
pub use radiation::{RadiatingBack, STEFAN_BOLTZMANN, radiative_film};
pub use schema::schema;
pub use stated::{By, Stated, stated};
pub use versions::{Version, read_version, read_versions, variant_names};

/// Longest joint file, bytes.
pub const LONGEST_FILE: usize = 1_000_000;

/// Most bolts of a joint, and most entries of any list.
pub const MOST_PLACES: usize = 10_000;

/// Every fault of one reading, with the texts they stand in.
#[derive(Clone, Debug, PartialEq)]
pub struct Faults {
    /// Name and text: the file first, its name left empty for the caller, then each override, then
    /// each table that the file names, as it names it.
    pub sources: Vec<(String, String)>,
    /// Faults in file order, each with the index of its text.
    pub faults: Vec<(usize, Fault)>,
}

impl Faults {
    /// What the first fault says.
    pub fn first(&self) -> String {
        let first = self.faults.first();
        first.map_or_else(String::new, |(_, fault)| fault.message.clone())
    }

    /// All faults as text; `path` names the file.
    pub fn shown(&self, path: &str, colour: Colour) -> String {
        let shown = self.faults.iter().map(|(source, fault)| {
            let (name, text) = &self.sources[*source];
            let name = if name.is_empty() { path } else { name };
            diagnostic::shown(fault, name, text, colour)
        });
        shown.collect::<Vec<String>>().join("\n\n")
    }
}

/// Reads a joint file; on failure returns every fault found, in file order.
pub fn read(text: &str) -> Result<Joint, Vec<Fault>> {
    read_with(text, &[]).map_err(|all| all.faults.into_iter().map(|(_, fault)| fault).collect())
}

/// Reads a joint file with overrides such as `plate.upper.thickness="6 mm"`, which act before
/// anything is checked. Faults in an override point to the override.
///
/// A table that the file names is not read: see [`read_with_files`].
pub fn read_with(text: &str, sets: &[String]) -> Result<Joint, Faults> {
    read_with_files(text, sets, &|_| Err("no files are read here".into()))
}

/// Reads a joint file with overrides, and the tables it names (`flatness_map`) by `files`: from
/// the name as stated to the text, or to the reason why there is none. Faults in a table point
/// into the table.
pub fn read_with_files(text: &str, sets: &[String], files: &Files<'_>) -> Result<Joint, Faults> {
    versions::read_version(text, (sets, None), files)
}

/// Spans count through the file, then through the overrides and the tables, each after a line
/// break; here they are given back to their own texts.
fn placed(
    text: &str,
    sets: &[String],
    (tables, faults): (Vec<(String, String)>, Vec<Fault>),
) -> Faults {
    let mut sources = vec![(String::new(), text.to_owned())];
    let sets = sets.iter().map(|set| (format!("--set {set}"), set.clone()));
    sources.extend(sets.chain(tables));
    let mut starts = Vec::with_capacity(sources.len());
    let mut start = 0;
    for (_, text) in &sources {
        starts.push(start);
        start += text.len() + 1;
    }
    let faults = faults.into_iter().map(|mut fault| {
        let source = starts.partition_point(|start| *start <= fault.span.start) - 1;
        let (start, length) = (starts[source], sources[source].1.len());
        let inside = |at: usize| at.saturating_sub(start).min(length);
        fault.span = inside(fault.span.start)..inside(fault.span.end);
        (source, fault)
    });
    Faults {
        faults: faults.collect(),
        sources,
    }
}

/// The joint of a file, or that of one of its variants, counted from 0.
fn reading(
    text: &str,
    (sets, variant): (&[String], Option<usize>),
    tables: &mut Tables<'_>,
) -> (Option<Joint>, Vec<Fault>) {
    if text.len() > LONGEST_FILE {
        let told = fault(
            "file/too-large",
            &(0..0),
            format!("the file has {} bytes", text.len()),
        )
        .expecting(format!("expected at most {LONGEST_FILE} bytes"));
        return (None, vec![told]);
    }
    if text
        .trim_matches(|c: char| c.is_whitespace() || c == '\u{feff}')
        .is_empty()
    {
        let told = fault("file/empty", &(0..0), "the file is empty")
            .expecting("expected a joint")
            .help("`ringsum new` writes one to start from");
        return (None, vec![told]);
    }
    let (table, errors) = DeTable::parse_recoverable(text);
    let syntax = syntax::faults(&errors, text);
    let mut collector = Collector::default();
    let mut tree = Node::file(&table);
    let variants = variants::taken(&mut tree, &mut collector);
    let formed = collector.count();
    if let Some(variant) = variant.and_then(|variant| variants.get(variant)) {
        variant.apply((&mut tree, text), &mut collector);
    }
    let mut start = text.len() + 1;
    for set in sets {
        overrides::apply(&mut tree, set, start, &mut collector);
        start += set.len() + 1;
    }
    let overridden = collector.count() == formed;
    let file = walk::file(&tree, &FILE, &mut collector);
    if let Some(told) = newer_format(&file) {
        return (None, vec![told]);
    }
    let readable = syntax::all_recovered(&errors);
    let joint = if overridden && readable {
        assembled(&file, tables, &mut collector)
    } else {
        None
    };
    let (faults, assumptions) = collector.into_parts();
    let mut faults = syntax::without_echoes(faults, &syntax, text);
    if !readable {
        // What seems missing may stand in the part that could not be read.
        faults.retain(|fault| fault.code != "file/missing-key");
    }
    faults.extend(syntax);
    faults.sort_by_key(|fault| fault.span.start);
    let joint = joint.map(|joint| Joint {
        assumptions,
        ..joint
    });
    (joint, faults)
}

fn newer_format(file: &Record) -> Option<Fault> {
    let format = *file.counts("format")?.first()?;
    (format > FORMAT).then(|| {
        fault(
            "file/format",
            &file.span("format"),
            format!("this file is of format {format}"),
        )
        .expecting(format!("this version reads format {FORMAT}"))
        .help(format!(
            "a newer ringsum reads it; this one is {}",
            env!("CARGO_PKG_VERSION")
        ))
    })
}

/// The joint, in the order of the file's parts; none when a part is faulty.
fn assembled(file: &Record, tables: &mut Tables<'_>, collector: &mut Collector) -> Option<Joint> {
    let own = materials::own(file, collector);
    let plates = plates::read(file, &own, tables, collector);
    let heat = heating::heat(file, collector);
    let back = plates
        .as_ref()
        .and_then(|plates| cooling::back(plates.last()?, collector));
    let service = service::read(file, (heat, back.as_ref()), collector);
    let temperature = service
        .as_ref()
        .and_then(|service| service.cases.first())
        .map(|case| case.temperature);
    let fillers = filler::read(file, plates.as_deref(), collector);
    let measured = filler::measured(file, temperature, collector);
    let Some(plates) = plates else {
        fasteners::read_alone(file, collector);
        return None;
    };
    limits::plates(&plates, collector);
    let source = heating::read(&plates[0], collector);
    let sink = cooling::read(&plates[plates.len() - 1], collector);
    sandwich::cooled(&plates[plates.len() - 1], sink.as_ref(), collector);
    let contact = contact::read(file, &plates, collector);
    let fasteners = fasteners::read(file, (&plates, &own), collector);
    if let Some(fasteners) = &fasteners {
        limits::seats(file, fasteners, collector);
    }
    let losses = contact::losses(file, collector);
    let arrange = arrange::read(file, collector);
    let bolts_scatter = uncertainty::bolts(file, collector);
    let names: Vec<String> = plates.iter().map(|plate| plate.name.clone()).collect();
    let plates: Option<Vec<Plate>> = plates
        .into_iter()
        .map(plates::PlateDraft::finished)
        .collect();
    let joint = Joint {
        title: file.text("title").unwrap_or("Bolted joint").to_owned(),
        service: service?,
        plates: plates?,
        source: source?,
        sink: sink?,
        fasteners: fasteners?,
        contact: contact?,
        fillers: fillers?,
        measured: measured?,
        losses: losses?,
        cost: file.number("cost"),
        missing: Vec::new(),
        arrange: arrange?,
        uncertain: uncertainty::stated(file, &names),
        bolts_scatter: bolts_scatter?,
        assumptions: Vec::new(),
    };
    cold::check(&joint, file, collector);
    loads::check(&joint, file, collector);
    zones::check(&joint, file, collector);
    Some(joint)
}

#[cfg(test)]
mod fixture;
