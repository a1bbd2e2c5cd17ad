//! A joint file with its variants: each version read as a file of its own, all faults together.

use toml::de::DeTable;

use crate::{
    diagnostic::Fault,
    joint::{
        Faults, Files, Joint,
        collector::{Collector, MOST_FAULTS},
        maps::Tables,
        placed, reading,
        tree::Node,
        variants,
    },
};

/// One version of the joint of a file.
#[derive(Clone, Debug, PartialEq)]
pub struct Version {
    /// The variant's name; none for the joint as stated.
    pub name: Option<String>,
    /// The joint.
    pub joint: Joint,
}

/// Names of the variants of a file, in file order; a file that cannot be read has none.
pub fn variant_names(text: &str) -> Vec<String> {
    let (table, _) = DeTable::parse_recoverable(text);
    let mut tree = Node::file(&table);
    let variants = variants::taken(&mut tree, &mut Collector::default());
    variants.into_iter().map(|variant| variant.name).collect()
}

/// Reads the joint of a file and every variant of it, with overrides that act on all of them and
/// after the variant's own; on failure tells every fault of every version, each once.
pub fn read_versions(
    text: &str,
    sets: &[String],
    files: &Files<'_>,
) -> Result<Vec<Version>, Faults> {
    let stated = read_version(text, (sets, None), files);
    let mut all = placed(text, sets, (Vec::new(), Vec::new()));
    let mut versions = Vec::new();
    match stated {
        Ok(joint) => versions.push(Version { name: None, joint }),
        Err(faults) => all = faults,
    }
    let names = variant_names(text);
    // A variant with faults without end must not hide those of the others.
    let share = (MOST_FAULTS / (names.len() + 1)).max(FEWEST_TOLD);
    for (place, name) in names.into_iter().enumerate() {
        match read_version(text, (sets, Some(place)), files) {
            Ok(joint) => versions.push(Version {
                name: Some(name),
                joint,
            }),
            Err(faults) => add(&mut all, faults, (&name, share)),
        }
    }
    if all.faults.is_empty() {
        Ok(versions)
    } else {
        all.faults
            .sort_by_key(|(source, fault)| (*source, fault.span.start));
        Err(all)
    }
}

/// Reads the joint of a file, or one of its variants, counted from 0.
pub fn read_version(
    text: &str,
    (sets, variant): (&[String], Option<usize>),
    files: &Files<'_>,
) -> Result<Joint, Faults> {
    let start = text.len() + 1 + sets.iter().map(|set| set.len() + 1).sum::<usize>();
    let mut tables = Tables::new(files, start);
    let (joint, faults) = reading(text, (sets, variant), &mut tables);
    match joint {
        Some(joint) if faults.is_empty() => Ok(joint),
        _ => Err(placed(text, sets, (tables.read, faults))),
    }
}

/// Faults that are told of every variant, however many there are.
const FEWEST_TOLD: usize = 10;

/// Adds what only a variant is at fault with, and says which; no more than its share.
fn add(all: &mut Faults, faults: Faults, (variant, share): (&str, usize)) {
    let mut told = 0;
    for (source, fault) in faults.faults {
        let source = &faults.sources[source];
        let place = all.sources.iter().position(|known| known == source);
        let place = place.unwrap_or_else(|| {
            all.sources.push(source.clone());
            all.sources.len() - 1
        });
        let known = all.faults.iter().any(|(at, known)| {
            *at == place
                && known.code == fault.code
                && known.span == fault.span
                && known.message == fault.message
        });
        if !known && told < share {
            told += 1;
            let message = format!("variant `{variant}`: {}", fault.message);
            all.faults.push((place, Fault { message, ..fault }));
        }
    }
}
