//! The catalogue as tables for people, and the names of each kind.

use crate::catalog::{
    fillers::fillers,
    finishes::finishes,
    friction::friction,
    gases::gases,
    grades::grades,
    materials::materials,
    methods::methods,
    platings::platings,
    records::{Datum, Status},
    seats::{clearance_hole, seat_names, seats},
    threads::{origins, threads},
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
/// Where the values of a record differ in origin, status and source are those of the first value
/// that is not a name.
pub fn table(kind: Kind) -> Table {
    match kind {
        Kind::Materials => material_table(),
        Kind::Finishes => finish_table(),
        Kind::Threads => thread_table(),
        Kind::Heads => head_table(),
        Kind::Grades => grade_table(),
        Kind::Friction => friction_table(),
        Kind::Tightening => tightening_table(),
        Kind::Gases => gas_table(),
        Kind::Fillers => filler_table(),
        Kind::Platings => plating_table(),
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

fn status(status: Status) -> String {
    match status {
        Status::Seen => "seen",
        Status::Memory => "memory",
        Status::Computed => "computed",
        Status::Judgement => "judgement",
        Status::User => "user",
    }
    .to_owned()
}

/// A number to four significant digits, without trailing zeros or binary dust.
fn number(value: f64) -> String {
    if value == 0.0 || !value.is_finite() {
        return value.to_string();
    }
    let decimals = 3 - value.abs().log10().floor() as i32;
    let text = format!("{value:.*}", decimals.clamp(0, 12) as usize);
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// A value in a unit with its range: `167 (155–180)`.
fn spread(datum: &Datum, unit: f64) -> String {
    let value = number(datum.value / unit);
    match datum.range {
        Some([low, high]) => format!("{value} ({}–{})", number(low / unit), number(high / unit)),
        None => value,
    }
}

fn maybe(datum: Option<&Datum>, unit: f64) -> String {
    datum.map_or_else(|| "–".to_owned(), |datum| spread(datum, unit))
}

fn length(value: Option<f64>, unit: f64) -> String {
    value.map_or_else(|| "–".to_owned(), |value| number(value / unit))
}

fn yes(answer: bool) -> String {
    if answer { "yes" } else { "no" }.to_owned()
}

fn material_table() -> Table {
    let rows = materials().iter().map(|r| {
        let fit = r.conductivity_fit.as_ref();
        vec![
            r.name.clone(),
            spread(&r.conductivity, 1.0),
            fit.map_or_else(
                || "–".to_owned(),
                |fit| format!("{}–{}", number(fit.valid[0]), number(fit.valid[1])),
            ),
            spread(&r.youngs_modulus, 1e9),
            number(r.poisson.value),
            spread(&r.expansion, 1e-6),
            maybe(r.hardness.as_ref(), 1e6),
            maybe(r.yield_strength.as_ref(), 1e6),
            maybe(r.bearing_limit.as_ref(), 1e6),
            maybe(r.density.as_ref(), 1.0),
            r.aliases.join("; "),
            r.note.clone().unwrap_or_default(),
            status(r.conductivity.status),
            r.conductivity.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "material",
            "k W/(m·K)",
            "k(T) from, to K",
            "E GPa",
            "ν",
            "α µm/(m·K)",
            "H MPa",
            "yield MPa",
            "bearing limit MPa",
            "ρ kg/m³",
            "also",
            "remark",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn finish_table() -> Table {
    let rows = finishes().iter().map(|r| {
        vec![
            r.name.clone(),
            spread(&r.roughness_average, 1e-6),
            spread(&r.flatness_per_100mm, 1e-6),
            r.aliases.join("; "),
            r.note.clone().unwrap_or_default(),
            status(r.roughness_average.status),
            r.roughness_average.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "finish",
            "Ra µm",
            "flatness µm per 100 mm",
            "also",
            "remark",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn thread_table() -> Table {
    let rows = threads()
        .iter()
        .zip(origins())
        .map(|(r, (series, origin))| {
            let holes = clearance_hole(&r.name).map(|hole| hole.diameters);
            vec![
                r.name.clone(),
                series.to_owned(),
                number(r.diameter / 1e-3),
                number(r.pitch / 1e-3),
                number(r.pitch_diameter / 1e-3),
                number(r.minor_diameter / 1e-3),
                number(r.nut_minor_diameter / 1e-3),
                number(r.stress_area / 1e-6),
                holes.map_or_else(
                    || "–".to_owned(),
                    |d| d.map(|d| number(d / 1e-3)).join(" / "),
                ),
                status(origin.status),
                origin.source.clone(),
            ]
        });
    Table {
        columns: vec![
            "thread",
            "series",
            "d mm",
            "P mm",
            "d₂ mm",
            "d₃ mm",
            "D₁ mm",
            "A_s mm²",
            "holes fine / medium / coarse mm",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn head_table() -> Table {
    let rows = seats().iter().map(|r| {
        vec![
            r.kind.clone(),
            r.standard.clone(),
            r.thread.clone(),
            number(r.outer / 1e-3),
            length(r.inner, 1e-3),
            length(r.height, 1e-3),
            status(r.status),
            r.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "kind",
            "standard",
            "thread",
            "seat outer ⌀ mm",
            "seat inner ⌀ mm",
            "height mm",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn grade_table() -> Table {
    let rows = grades().iter().map(|r| {
        vec![
            r.name.clone(),
            r.standard.clone(),
            spread(&r.tensile, 1e6),
            maybe(r.yield_strength.as_ref(), 1e6),
            maybe(r.proof.as_ref(), 1e6),
            number(r.youngs_modulus / 1e9),
            number(r.expansion / 1e-6),
            spread(&r.conductivity, 1.0),
            r.like.clone(),
            status(r.tensile.status),
            r.tensile.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "grade",
            "standard",
            "tensile MPa",
            "yield MPa",
            "proof MPa",
            "E GPa",
            "α µm/(m·K)",
            "k W/(m·K)",
            "in the cold like",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn friction_table() -> Table {
    let rows = friction().iter().map(|r| {
        vec![
            r.name.clone(),
            if r.nut_factor { "K" } else { "µ" }.to_owned(),
            number(r.values[0]),
            number(r.values[1]),
            number(r.values[2]),
            r.describes.clone(),
            status(r.status),
            r.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "friction",
            "symbol (1)",
            "low",
            "nominal",
            "high",
            "stands for",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn tightening_table() -> Table {
    let rows = methods().iter().map(|r| {
        vec![
            r.name.clone(),
            r.family.clone(),
            number(r.scatter[0] * 100.0),
            number(r.scatter[1] * 100.0),
            status(r.status),
            r.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "method",
            "family",
            "least ± %",
            "most ± %",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn gas_table() -> Table {
    let rows = gases().iter().map(|r| {
        // Every table holds 300 K; the nearest entry would do otherwise.
        let at = r.temperatures.iter().position(|t| *t >= 300.0).unwrap_or(0);
        vec![
            r.name.clone(),
            number(r.conductivity[at]),
            number(r.mean_free_path[at] / 1e-9),
            number(r.prandtl[at]),
            number(r.heat_ratio[at]),
            spread(&r.accommodation, 1.0),
            format!(
                "{}–{}",
                number(r.temperatures[0]),
                number(r.temperatures[r.temperatures.len() - 1])
            ),
            status(Status::Computed),
            r.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "gas",
            "k at 300 K W/(m·K)",
            "mean free path at 300 K, 1 atm nm",
            "Pr",
            "γ",
            "accommodation",
            "tables from, to K",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn filler_table() -> Table {
    let rows = fillers().iter().map(|r| {
        let point = |(p, a): &(f64, f64)| format!("{} at {}", number(a / 1e-4), number(p / 1e3));
        vec![
            r.name.clone(),
            r.model.clone(),
            spread(&r.conductivity, 1.0),
            maybe(r.thickness.as_ref(), 1e-6),
            maybe(r.yield_stress.as_ref(), 1.0),
            r.points.iter().map(point).collect::<Vec<_>>().join("; "),
            yes(r.creeps),
            yes(r.silicone),
            yes(r.insulates),
            r.aliases.join("; "),
            r.note.clone().unwrap_or_default(),
            status(r.status),
            r.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "filler",
            "model",
            "k W/(m·K)",
            "thickness µm",
            "yield stress Pa",
            "R cm²·K/W at kPa",
            "creeps",
            "silicone",
            "insulates",
            "also",
            "remark",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}

fn plating_table() -> Table {
    let rows = platings().iter().map(|r| {
        vec![
            r.name.clone(),
            if r.metal { "metal" } else { "film" }.to_owned(),
            spread(&r.conductivity, 1.0),
            maybe(r.hardness.as_ref(), 1e9),
            spread(&r.typical_thickness, 1e-6),
            r.aliases.join("; "),
            r.note.clone().unwrap_or_default(),
            status(r.conductivity.status),
            r.conductivity.source.clone(),
        ]
    });
    Table {
        columns: vec![
            "plating",
            "kind",
            "k W/(m·K)",
            "H GPa",
            "thickness µm",
            "also",
            "remark",
            "status",
            "source",
        ],
        rows: rows.collect(),
    }
}
