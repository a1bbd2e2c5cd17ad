//! Plate materials: from the catalogue, from the file, or one with changes.

use std::collections::BTreeMap;

use crate::{
    catalog::{self, ConductivityFit, Datum, FitForm, Material, MaterialKind, Status},
    diagnostic,
    joint::{
        collector::{Collector, Wording, fault},
        record::{Record, Spread, Width},
        sections::MATERIAL,
        tree::{Span, short},
        walk::missing,
    },
    numerics::distribution::Shape,
};

/// Poisson's ratio taken for a metal that states none: aluminium, copper and steel lie within
/// 0.28 to 0.34.
const POISSON: f64 = 0.33;

/// The temperature at which the catalogue starts to count contraction, K.
const REFERENCE_TEMPERATURE: f64 = 293.0;

/// The lowest temperature that a file may state, K.
const LOWEST: f64 = 0.01;

/// Most materials that one fault suggests.
const MOST_SUGGESTED: usize = 5;

/// Materials of the file by name; none where the table is faulty.
pub(super) type Own = BTreeMap<String, Option<Material>>;

/// Reads the `[[material]]` tables.
pub(super) fn own(file: &Record, collector: &mut Collector) -> Own {
    let mut own = Own::new();
    for record in file.records("material") {
        let Some(name) = record.text("name") else {
            if !record.has("name") {
                collector.report(missing(record, "name", "name = \"my plate\""));
            }
            continue;
        };
        if own.contains_key(name) {
            collector.report(duplicate("material", name, &record.span("name")));
            continue;
        }
        let material = read(record, &Own::new(), collector);
        own.insert(name.to_owned(), material);
    }
    own
}

/// Reads the material of a plate.
///
/// A plate may state a conductivity in its plane and one through its thickness of its own; they
/// stand for every temperature.
pub(super) fn of_plate(plate: &Record, own: &Own, collector: &mut Collector) -> Option<Material> {
    let mut material = read(plate.record("material")?, own, collector)?;
    if plate.is_faulty("conductivity") {
        return None;
    }
    if let Some(stated) = plate.record("conductivity") {
        let in_plane = stated.spread("in_plane")?;
        material.conductivity = spread(in_plane);
        material.conductivity_fit = Some(constant(in_plane.bounds.nominal, LOWEST));
        material.through = Some(user(stated.number("through")?));
    }
    Some(material)
}

/// Reads a material that stands under a key of its own.
pub(super) fn at(
    record: &Record,
    key: &str,
    own: &Own,
    collector: &mut Collector,
) -> Option<Material> {
    read(record.record(key)?, own, collector)
}

/// Two tables with one name.
pub(super) fn duplicate(what: &str, name: &str, span: &Span) -> crate::diagnostic::Fault {
    fault(
        "file/duplicate",
        span,
        format!("a second {what} is called `{}`", short(name)),
    )
    .expecting("expected another name")
}

fn read(record: &Record, own: &Own, collector: &mut Collector) -> Option<Material> {
    let before = collector.count();
    let base = match record.text("like") {
        Some(name) => Some(base(record, name, own, collector)?),
        None if record.has("like") => return None,
        None => None,
    };
    let material = match base {
        Some(material) => changed(material, record, collector),
        None => fresh(record, collector)?,
    };
    (collector.count() == before).then_some(material)
}

fn base(record: &Record, name: &str, own: &Own, collector: &mut Collector) -> Option<Material> {
    if let Some(material) = own.get(name) {
        return material.clone();
    }
    if let Some(material) = catalog::material(name) {
        return Some(material.clone());
    }
    if collector.is_full() {
        return None;
    }
    let mine: Vec<&str> = own.keys().map(String::as_str).collect();
    collector.report(
        fault(
            "name/unknown",
            &record.span("like"),
            format!("no material is called `{}`", short(name)),
        )
        .expecting("not in the catalogue, nor a [[material]] of this file")
        .help("`ringsum list materials` names all; describe your own in a [[material]] table")
        .meaning(&meant(name, &mine)),
    );
    None
}

/// A name of the catalogue for a bare number: its own record, or the one most likely meant.
pub(super) fn likely(number: &str) -> Option<String> {
    let known = catalog::material(number).map(|_| number);
    known
        .or_else(|| meant(number, &[]).first().copied())
        .map(str::to_owned)
}

/// Materials that were probably meant by an unknown name: a family, those that hold the name, or
/// the nearest. `own` are materials of the file.
fn meant<'a>(name: &str, own: &[&'a str]) -> Vec<&'a str> {
    if let Some(family) = catalog::family(name) {
        return family.to_vec();
    }
    let mut found = catalog::unified(name);
    if found.is_empty() && name.trim().chars().count() >= 3 {
        found = catalog::holding(name);
    }
    if !found.is_empty() {
        found.truncate(MOST_SUGGESTED);
        return found;
    }
    // Another number is another alloy, not a slip.
    let number = number(name);
    let mut known = own.to_vec();
    // A slip of `al` or `cu` may as well be another metal.
    for word in catalog::family_words().filter(|word| word.len() > 3) {
        known.push(word);
    }
    let names = catalog::materials().iter().flat_map(|material| {
        std::iter::once(&material.name)
            .chain(&material.aliases)
            .map(String::as_str)
    });
    for other in names {
        if number.is_none() || self::number(other) == number {
            known.push(other);
        }
    }
    let Some(near) = diagnostic::nearest(name, known.into_iter()) else {
        return Vec::new();
    };
    if let Some(mine) = own.iter().find(|mine| **mine == near) {
        return vec![mine];
    }
    match (catalog::family(&near), catalog::material(&near)) {
        (Some(family), _) => family.to_vec(),
        (None, Some(material)) => vec![material.name.as_str()],
        (None, None) => Vec::new(),
    }
}

/// The first number of a name that has three digits or more: `6061` of `Al 6061-T6`.
fn number(name: &str) -> Option<&str> {
    name.split(|letter: char| !letter.is_ascii_digit())
        .find(|digits| digits.len() >= 3)
}

/// A material that the file describes alone.
fn fresh(record: &Record, collector: &mut Collector) -> Option<Material> {
    for key in ["conductivity", "youngs_modulus", "expansion"] {
        if !record.has(key) {
            let line = MATERIAL.field(key).map(crate::joint::fields::Field::line);
            collector.report(missing(record, key, &line.unwrap_or_default()));
        }
    }
    if !record.has("poisson") {
        collector.assume(
            record.at("poisson"),
            POISSON.to_string(),
            "not stated; metals lie between 0.28 and 0.34",
        );
    }
    let material = Material {
        name: record
            .text("name")
            .unwrap_or("material of the file")
            .to_owned(),
        aliases: Vec::new(),
        kind: MaterialKind::Metal,
        family: String::new(),
        conductivity: spread(record.spread("conductivity")?),
        conductivity_fit: None,
        through: None,
        youngs_modulus: user(record.number("youngs_modulus")?),
        poisson: user(POISSON),
        expansion: user(record.number("expansion")?),
        contraction: None,
        density: None,
        hardness: None,
        microhardness: None,
        microhardness_spread: None,
        yield_strength: None,
        bearing_limit: None,
        note: None,
    };
    Some(changed(material, record, collector))
}

/// A material with what the record states in place of what it had.
fn changed(mut material: Material, record: &Record, collector: &mut Collector) -> Material {
    if let Some(name) = record.text("name") {
        name.clone_into(&mut material.name);
        material.aliases.clear();
    }
    if let Some(kind) = record.text("kind") {
        material.kind = match kind {
            "brittle" => MaterialKind::Brittle,
            "polymer" => MaterialKind::Polymer,
            "graphite" => MaterialKind::Graphite,
            _ => MaterialKind::Metal,
        };
    }
    if let Some(family) = record.text("family") {
        family.clone_into(&mut material.family);
    }
    if let Some(value) = record.spread("conductivity") {
        material.conductivity = spread(value);
        material.conductivity_fit = None;
    }
    if let Some(value) = record.number("through") {
        material.through = Some(user(value));
    }
    if let Some(value) = record.number("youngs_modulus") {
        material.youngs_modulus = user(value);
    }
    if let Some(value) = record.number("poisson") {
        material.poisson = user(value);
    }
    if let Some(value) = record.number("expansion") {
        material.expansion = user(value);
        material.contraction = None;
    }
    // A stated Meyer hardness replaces a catalogue microhardness, and the other way round.
    if let Some(value) = record.spread("hardness") {
        material.hardness = Some(spread(value));
        material.microhardness = None;
        material.microhardness_spread = None;
    }
    if let Some(micro) = record.record("microhardness")
        && let (Some(c1), Some(c2)) = (micro.spread("c1"), micro.number("c2"))
    {
        material.microhardness = Some([c1.bounds.nominal, c2]);
        material.microhardness_spread = Some(spread(c1));
    }
    if let Some(value) = record.number("density") {
        material.density = Some(user(value));
    }
    if let Some(value) = record.number("yield") {
        material.yield_strength = Some(user(value));
    }
    if let Some(value) = record.number("bearing_limit") {
        material.bearing_limit = Some(user(value));
    }
    if let Some(note) = record.text("note") {
        material.note = Some(note.to_owned());
    }
    if let Some(lowest) = record.number("valid_from") {
        hold_from(&mut material, lowest, record, collector);
    }
    material
}

/// Declares the stated conductivity and expansion to hold down to a temperature.
fn hold_from(material: &mut Material, lowest: f64, record: &Record, collector: &mut Collector) {
    if !record.has("conductivity") || !record.has("expansion") {
        collector.report(
            fault(
                "file/missing-key",
                &record.span("valid_from"),
                "`valid_from` speaks of the conductivity and expansion stated beside it",
            )
            .expecting("`conductivity` and `expansion` must stand here too"),
        );
        return;
    }
    let conductivity = material.conductivity.value;
    let expansion = material.expansion.value;
    material.conductivity_fit = Some(constant(conductivity, lowest));
    material.contraction = Some(vec![
        (lowest, expansion * (REFERENCE_TEMPERATURE - lowest)),
        (REFERENCE_TEMPERATURE, 0.0),
    ]);
}

/// A conductivity that holds down to a temperature.
fn constant(conductivity: f64, lowest: f64) -> ConductivityFit {
    ConductivityFit {
        form: FitForm::LogPolynomial,
        coefficients: vec![conductivity.log10()],
        valid: [lowest, REFERENCE_TEMPERATURE],
        source: "stated in the joint file".into(),
    }
}

fn user(value: f64) -> Datum {
    Datum {
        value,
        range: None,
        shape: Shape::Uniform,
        status: Status::User,
        source: "joint file".into(),
    }
}

fn spread(spread: Spread) -> Datum {
    Datum {
        range: match spread.width {
            Width::Single => None,
            Width::Range => Some([spread.bounds.low, spread.bounds.high]),
        },
        shape: spread.bounds.shape,
        ..user(spread.bounds.nominal)
    }
}
