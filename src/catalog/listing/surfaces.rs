//! Tables of materials, finishes, gases, fillers and platings.

use crate::catalog::{
    fillers::fillers,
    finishes::finishes,
    gases::gases,
    listing::{
        Table,
        cells::{maybe, number, origin, spread, status, yes},
    },
    materials::materials,
    platings::platings,
    records::Status,
};

pub(super) fn materials_table() -> Table {
    let rows = materials().iter().map(|r| {
        let fit = r.conductivity_fit.as_ref();
        let [status, source] = origin(&[
            ("k", Some(&r.conductivity)),
            ("E", Some(&r.youngs_modulus)),
            ("ν", Some(&r.poisson)),
            ("α", Some(&r.expansion)),
            ("H", r.hardness.as_ref()),
            ("yield", r.yield_strength.as_ref()),
            ("bearing limit", r.bearing_limit.as_ref()),
            ("ρ", r.density.as_ref()),
        ]);
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
            status,
            source,
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

pub(super) fn finishes_table() -> Table {
    let rows = finishes().iter().map(|r| {
        let [status, source] = origin(&[
            ("Ra", Some(&r.roughness_average)),
            ("flatness", Some(&r.flatness_per_100mm)),
        ]);
        vec![
            r.name.clone(),
            spread(&r.roughness_average, 1e-6),
            spread(&r.flatness_per_100mm, 1e-6),
            r.aliases.join("; "),
            r.note.clone().unwrap_or_default(),
            status,
            source,
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

pub(super) fn gases_table() -> Table {
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

pub(super) fn fillers_table() -> Table {
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

pub(super) fn platings_table() -> Table {
    let rows = platings().iter().map(|r| {
        let [status, source] = origin(&[
            ("k", Some(&r.conductivity)),
            ("H", r.hardness.as_ref()),
            ("thickness", Some(&r.typical_thickness)),
        ]);
        vec![
            r.name.clone(),
            if r.metal { "metal" } else { "film" }.to_owned(),
            spread(&r.conductivity, 1.0),
            maybe(r.hardness.as_ref(), 1e9),
            spread(&r.typical_thickness, 1e-6),
            r.aliases.join("; "),
            r.note.clone().unwrap_or_default(),
            status,
            source,
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
