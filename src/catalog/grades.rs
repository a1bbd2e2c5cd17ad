//! Bolt grades: read from `grades.toml`.

use std::sync::OnceLock;

use serde::Deserialize;

use crate::catalog::{
    materials::material,
    names::plain,
    raw::{CatalogFault, RawDatum, Sources, Values, embedded, parse},
    records::Grade,
};

/// All grades; one that its standard splits by diameter stands there once for each range.
pub fn grades() -> &'static [Grade] {
    &shelf().grades
}

/// A grade by name or alias, for a nominal thread diameter in m.
pub fn grade(name: &str, diameter: f64) -> Option<&'static Grade> {
    let rows = rows(name);
    rows.into_iter()
        .find(|row| holds(row.diameters, diameter))
        .map(|row| &shelf().grades[row.place])
}

/// Smallest and largest nominal diameter of a grade, m; none when no grade has this name.
pub fn grade_sizes(name: &str) -> Option<[f64; 2]> {
    rows(name)
        .into_iter()
        .map(|row| row.diameters)
        .reduce(|all, one| [all[0].min(one[0]), all[1].max(one[1])])
}

struct Row {
    names: Vec<String>,
    diameters: [f64; 2],
    place: usize,
}

pub(super) struct Rack {
    grades: Vec<Grade>,
    rows: Vec<Row>,
}

fn shelf() -> &'static Rack {
    static RACK: OnceLock<Rack> = OnceLock::new();
    RACK.get_or_init(|| embedded(read(include_str!("grades.toml"))))
}

fn rows(name: &str) -> Vec<&'static Row> {
    let name = plain(name);
    let named = |row: &&Row| row.names.contains(&name);
    shelf().rows.iter().filter(named).collect()
}

/// Whether a diameter lies in a range, give or take rounding of inch sizes.
fn holds([least, most]: [f64; 2], diameter: f64) -> bool {
    const SLACK: f64 = 1e-7;
    least - SLACK <= diameter && diameter <= most + SLACK
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    grade: Vec<RawGrade>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawGrade {
    name: String,
    aliases: Vec<String>,
    standard: String,
    #[serde(rename = "diameters_mm")]
    diameters: Option<[f64; 2]>,
    #[serde(rename = "tensile_MPa")]
    tensile: RawDatum,
    #[serde(rename = "yield_strength_MPa")]
    yield_strength: Option<RawDatum>,
    #[serde(rename = "proof_MPa")]
    proof: Option<RawDatum>,
    #[serde(rename = "youngs_modulus_GPa")]
    youngs_modulus: RawDatum,
    #[serde(rename = "expansion_um_mK")]
    expansion: RawDatum,
    #[serde(rename = "conductivity_W_mK")]
    conductivity: RawDatum,
    like: String,
    #[serde(rename = "note")]
    _note: Option<String>,
}

pub(super) fn read(text: &str) -> Result<Rack, CatalogFault> {
    let file: File = parse("grades.toml", text)?;
    let mut rack = Rack {
        grades: Vec::new(),
        rows: Vec::new(),
    };
    for raw in &file.grade {
        let grade = checked(raw, &file.sources)?;
        let names = std::iter::once(&raw.name).chain(&raw.aliases);
        let row = Row {
            names: names.map(|name| plain(name)).collect(),
            diameters: grade.diameters.unwrap_or([0.0, f64::INFINITY]),
            place: rack.grades.len(),
        };
        refuse_clash(&raw.name, &row, &rack.rows)?;
        rack.rows.push(row);
        rack.grades.push(grade);
    }
    Ok(rack)
}

/// Two rows may share a name only when no diameter belongs to both.
fn refuse_clash(name: &str, row: &Row, others: &[Row]) -> Result<(), CatalogFault> {
    let [least, most] = row.diameters;
    let twice = (1..row.names.len()).any(|n| row.names[..n].contains(&row.names[n]));
    let clash = others.iter().any(|other| {
        let shared = row.names.iter().any(|name| other.names.contains(name));
        shared && least <= other.diameters[1] && other.diameters[0] <= most
    });
    if twice || clash || least >= most {
        return Err(CatalogFault::new(
            name,
            "a name or a diameter range is given twice",
        ));
    }
    Ok(())
}

fn checked(raw: &RawGrade, sources: &Sources) -> Result<Grade, CatalogFault> {
    let values = Values {
        record: &raw.name,
        sources,
    };
    if material(&raw.like).is_none() {
        let what = format!("there is no material `{}`", raw.like);
        return Err(CatalogFault::new(&raw.name, what));
    }
    let grade = Grade {
        name: raw.name.clone(),
        standard: raw.standard.clone(),
        tensile: values.datum(&raw.tensile, 1e6)?,
        yield_strength: values.maybe(raw.yield_strength.as_ref(), 1e6)?,
        proof: values.maybe(raw.proof.as_ref(), 1e6)?,
        youngs_modulus: values.datum(&raw.youngs_modulus, 1e9)?.value,
        expansion: values.datum(&raw.expansion, 1e-6)?.value,
        conductivity: values.datum(&raw.conductivity, 1.0)?,
        diameters: raw.diameters.map(|range| range.map(|end| end * 1e-3)),
        like: raw.like.clone(),
    };
    let ordered = grade
        .yield_strength
        .iter()
        .all(|strength| strength.value < grade.tensile.value)
        && grade.proof.iter().all(|proof| {
            grade
                .yield_strength
                .iter()
                .all(|strength| proof.value < strength.value)
        });
    if ordered {
        Ok(grade)
    } else {
        Err(CatalogFault::new(
            &raw.name,
            "proof < yield < tensile must hold",
        ))
    }
}
