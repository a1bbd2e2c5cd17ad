//! Fields of what a bolt bears besides its tightening, and of what springs under it.

use crate::{
    joint::fields::{Field, Kind, Measure, Section, field},
    units::Quantity,
};

const fn load(key: &'static str, meaning: &'static str) -> Field {
    field(
        key,
        Kind::Spread(Measure::Quantity(Quantity::Force)),
        meaning,
        "\"500 N\"",
    )
    .within(0.0, 1e8)
}

const fn length(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(key, Kind::Quantity(Quantity::Length), meaning, example).within(1e-5, 1.0)
}

/// `axial_load` of a fastener.
pub static AXIAL_LOAD: Section = Section {
    name: "axial_load",
    meaning: "load from outside along each bolt, pulling the plates apart",
    shorthand: Some("value"),
    fields: &[
        load(
            "value",
            "load of each bolt in every case that states none of its own",
        ),
        load("hot", "load of each bolt in the hot case").default("as value"),
        load("cold", "load of each bolt in the cold case").default("as value"),
        field(
            "introduction",
            Kind::Spread(Measure::Number),
            "load introduction factor n of VDI 2230: 0 at the faying faces, 1 under the heads",
            "0.5",
        )
        .within(0.0, 1.0)
        .default("0.5; the bolt takes 1 and the clamp 0, each its worst"),
        field(
            "safety",
            Kind::Number,
            "factor by which the load must be able to grow before the faces part",
            "1.2",
        )
        .within(1.0, 100.0)
        .default("1.2"),
        field(
            "lasting",
            Kind::Flag,
            "whether the load acts while the heat is judged, and takes its part of the clamp force",
            "false",
        )
        .default("true"),
    ],
};

/// `disc_springs` of a fastener.
pub static DISC_SPRINGS: Section = Section {
    name: "disc_springs",
    meaning: "like disc (Belleville) springs without contact flats, sizes as in DIN EN 16983 (DIN 2093)",
    shorthand: None,
    fields: &[
        length("outer", "outer diameter", "\"10 mm\"").required(),
        length("inner", "inner diameter", "\"5.2 mm\"").required(),
        length("thickness", "thickness of a disc", "\"0.5 mm\"").required(),
        length(
            "cone_height",
            "height of the free cone: free height less thickness",
            "\"0.25 mm\"",
        )
        .required(),
        field(
            "parallel",
            Kind::Count,
            "discs nested in one set, whose forces add",
            "1",
        )
        .default("1"),
        field(
            "series",
            Kind::Count,
            "sets head to head, whose deflections add",
            "4",
        )
        .default("1"),
        field(
            "modulus",
            Kind::Quantity(Quantity::Pressure),
            "Young's modulus",
            "\"206 GPa\"",
        )
        .within(1e8, 1e12)
        .default("206 GPa, spring steel"),
    ],
};
