//! Tables of threads, heads, grades, friction and tightening.

use crate::catalog::{
    friction::friction,
    grades::grades,
    listing::{
        Table,
        cells::{length, maybe, number, origin, spread, status},
    },
    methods::methods,
    seats::{clearance_hole, seats},
    threads::{origins, threads},
};

pub(super) fn threads_table() -> Table {
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

pub(super) fn heads_table() -> Table {
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

pub(super) fn grades_table() -> Table {
    let rows = grades().iter().map(|r| {
        let [status, source] = origin(&[
            ("tensile", Some(&r.tensile)),
            ("yield", r.yield_strength.as_ref()),
            ("proof", r.proof.as_ref()),
            ("k", Some(&r.conductivity)),
        ]);
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
            status,
            source,
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

pub(super) fn friction_table() -> Table {
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

pub(super) fn tightening_table() -> Table {
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
