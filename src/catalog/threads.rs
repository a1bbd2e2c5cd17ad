//! Threads: diameter and pitch from `threads.toml`, the rest computed.

use std::{collections::BTreeMap, f64::consts::PI, sync::OnceLock};

use serde::Deserialize;

use crate::catalog::{
    raw::{CatalogFault, Origin, RawOrigin, RawStatus, Sources, embedded, parse},
    records::{Status, Thread},
};

/// 1 in in m.
const INCH: f64 = 0.0254;

/// All threads: metric coarse, metric fine, UNC, UNF.
pub fn threads() -> &'static [Thread] {
    &rack().threads
}

/// A thread by designation.
///
/// `M5`, `M5x0.8`, `M10 x 1.25`, `M10×1.25`, `1/4-20`, `1/4-28 UNF`, `#10-32`, `10-32`, `No. 10-32`.
/// A metric size without pitch is the coarse thread; an inch size needs its threads per inch.
pub fn thread(name: &str) -> Option<&'static Thread> {
    let rack = rack();
    rack.index
        .get(&key(name))
        .map(|place| &rack.threads[*place])
}

/// The size of a thread without its pitch: `M10` of `M10x1.25`, `1/4` of `1/4-28`.
pub(super) fn size(thread: &Thread) -> &str {
    let name = thread.name.as_str();
    let end = name.find(if thread.inch { '-' } else { 'x' });
    &name[..end.unwrap_or(name.len())]
}

/// Series of a thread, and status and source of its diameter and pitch.
pub fn thread_origin(name: &str) -> Option<(&'static str, Status, &'static str)> {
    let rack = rack();
    let (series, origin) = &rack.origins[*rack.index.get(&key(name))?];
    Some((series, origin.status, &origin.source))
}

/// A designation as people write it, brought to the one form under which threads are entered.
fn key(name: &str) -> String {
    let bare: String = name
        .chars()
        .filter(|c| !c.is_whitespace())
        .flat_map(char::to_lowercase)
        .map(|c| match c {
            '‐' | '‑' | '–' | '—' => '-',
            '×' | '*' => 'x',
            ',' => '.',
            other => other,
        })
        .collect();
    let series = ["unrc", "unrf", "unc", "unf"];
    let bare = series
        .iter()
        .find_map(|series| bare.strip_suffix(series))
        .unwrap_or(&bare)
        .trim_end_matches('-');
    if let Some(number) = bare.strip_prefix("no.") {
        return format!("#{number}");
    }
    if bare.starts_with(|c: char| c.is_ascii_digit()) && !bare.contains('/') {
        return format!("#{bare}");
    }
    // `M5x.8` and `M10x1.250` are the same as `M5x0.8` and `M10x1.25`.
    match bare
        .split_once('x')
        .map(|(size, pitch)| (size, pitch.parse::<f64>()))
    {
        Some((size, Ok(pitch))) => format!("{size}x{pitch}"),
        _ => bare.to_owned(),
    }
}

pub(super) struct Rack {
    threads: Vec<Thread>,
    origins: Vec<(String, Origin)>,
    index: BTreeMap<String, usize>,
}

fn rack() -> &'static Rack {
    static RACK: OnceLock<Rack> = OnceLock::new();
    RACK.get_or_init(|| embedded(read(include_str!("threads.toml"))))
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
    series: String,
    system: RawSystem,
    status: RawStatus,
    source: String,
    threads: Vec<RawThread>,
}

#[derive(Clone, Copy, Deserialize)]
#[serde(rename_all = "lowercase")]
enum RawSystem {
    Metric,
    Inch,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawThread {
    name: String,
    diameter_mm: Option<f64>,
    pitch_mm: Option<f64>,
    diameter_in: Option<f64>,
    per_inch: Option<f64>,
}

pub(super) fn read(text: &str) -> Result<Rack, CatalogFault> {
    let file: File = parse("threads.toml", text)?;
    let mut rack = Rack {
        threads: Vec::new(),
        origins: Vec::new(),
        index: BTreeMap::new(),
    };
    for group in &file.group {
        let origin = file.sources.origin(&RawOrigin {
            status: group.status,
            source: group.source.clone(),
            of: None,
        })?;
        for raw in &group.threads {
            let thread = checked(raw, group.system)?;
            for name in names(&thread, &group.series) {
                if rack.index.insert(key(&name), rack.threads.len()).is_some() {
                    return Err(CatalogFault::new(&name, "two threads have this name"));
                }
            }
            rack.threads.push(thread);
            rack.origins.push((group.series.clone(), origin.clone()));
        }
    }
    Ok(rack)
}

/// The names of a thread; a coarse metric one also answers with its pitch.
fn names(thread: &Thread, series: &str) -> Vec<String> {
    let mut names = vec![thread.name.clone()];
    if series == "metric coarse" {
        names.push(format!("{}x{}", thread.name, millimetres(thread.pitch)));
    }
    names
}

/// A length in mm without the dust of binary fractions.
fn millimetres(length: f64) -> f64 {
    (length * 1e6).round() / 1e3
}

fn checked(raw: &RawThread, system: RawSystem) -> Result<Thread, CatalogFault> {
    let (inch, diameter, pitch) = match (system, raw) {
        (
            RawSystem::Metric,
            RawThread {
                diameter_mm: Some(diameter),
                pitch_mm: Some(pitch),
                diameter_in: None,
                per_inch: None,
                ..
            },
        ) => (false, diameter * 1e-3, pitch * 1e-3),
        (
            RawSystem::Inch,
            RawThread {
                diameter_in: Some(diameter),
                per_inch: Some(per_inch),
                diameter_mm: None,
                pitch_mm: None,
                ..
            },
        ) => (true, diameter * INCH, INCH / per_inch),
        _ => return Err(CatalogFault::new(&raw.name, "diameter or pitch is missing")),
    };
    let thread = geometry(raw.name.clone(), inch, [diameter, pitch]);
    if 0.0 < thread.pitch && 0.0 < thread.minor_diameter {
        Ok(thread)
    } else {
        Err(CatalogFault::new(
            &raw.name,
            "the pitch does not fit the diameter",
        ))
    }
}

/// The diameters of a thread of 60° from its nominal diameter and pitch.
///
/// ```text
/// d₂ = d − 0.649519 P      D₁ = d − 1.082532 P      A_s = π d₀²/4
/// metric  d₃ = d − 1.226869 P      d₀ = d − 0.938194 P
/// inch    d₃ = d − 1.19078 P       d₀ = d − 0.974279 P
/// ```
///
/// | symbol | quantity | SI unit | field |
/// |---|---|---|---|
/// | `d`, `P` | nominal diameter, pitch | m | `diameter`, `pitch` |
/// | `d₂` | pitch diameter | m | `pitch_diameter` |
/// | `d₃` | minor diameter of the bolt | m | `minor_diameter` |
/// | `D₁` | minor diameter of the nut | m | `nut_minor_diameter` |
/// | `d₀` | stress diameter | m | `stress_diameter` |
/// | `A_s` | stress area | m² | `stress_area` |
///
/// The two systems do not share the constants of d₃ and d₀.
///
/// Source: ISO 68-1, ISO 724, ISO 898-1; ASME B1.1 (d₃ is the UNR design minor diameter, from memory).
/// Checked: `metric_stress_areas_are_those_printed`, `inch_stress_areas_are_those_printed`.
fn geometry(name: String, inch: bool, [diameter, pitch]: [f64; 2]) -> Thread {
    let (minor, stress) = if inch {
        (1.19078, 0.974279)
    } else {
        (1.226869, 0.938194)
    };
    let stress_diameter = diameter - stress * pitch;
    Thread {
        name,
        inch,
        diameter,
        pitch,
        pitch_diameter: diameter - 0.649519 * pitch,
        minor_diameter: diameter - minor * pitch,
        nut_minor_diameter: diameter - 1.082532 * pitch,
        stress_diameter,
        stress_area: PI / 4.0 * stress_diameter * stress_diameter,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn designations_resolve_as_people_write_them() {
        for (written, name) in [
            ("M5", "M5"),
            ("m5", "M5"),
            ("M5x0.8", "M5"),
            ("M 5 x .8", "M5"),
            ("M5x0,8", "M5"),
            ("M10 x 1.25", "M10x1.25"),
            ("M10×1.5", "M10"),
            ("M10x1.250", "M10x1.25"),
            ("1/4-20", "1/4-20"),
            ("1/4-28 UNF", "1/4-28"),
            ("1/4 - 28 UNRF", "1/4-28"),
            ("#10-32", "#10-32"),
            ("10-32", "#10-32"),
            ("No. 10-32", "#10-32"),
            ("1/2-13UNC", "1/2-13"),
        ] {
            let found = thread(written).map(|thread| thread.name.as_str());
            assert_eq!(found, Some(name), "{written}");
        }
    }

    #[test]
    fn what_is_no_thread_is_not_found() {
        for written in [
            "", "M", "M5.5", "M5x", "M5x1", "1/4", "#10", "10", "1032", "1/4-29", "x", "UNC",
        ] {
            assert_eq!(thread(written), None, "{written}");
        }
    }

    #[test]
    fn a_size_is_the_name_without_the_pitch() {
        for (name, of) in [
            ("M10x1.25", "M10"),
            ("M5", "M5"),
            ("#10-32", "#10"),
            ("1/4-28", "1/4"),
        ] {
            assert_eq!(thread(name).map(size), Some(of));
        }
    }
}
