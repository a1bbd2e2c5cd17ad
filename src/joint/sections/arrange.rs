//! Fields of the search for a layout of fasteners.

use crate::{
    joint::{
        fields::{Field, Kind, Measure, Section, field},
        sections::{
            TORQUE,
            fasteners::{GRADE, HEAD, NUT_WASHER, THREAD, WASHER},
        },
    },
    units::Quantity,
};

/// Families of patterns, as users write them.
pub const FAMILIES: [&str; 4] = ["edge", "grid", "circle", "free"];

/// Symmetries of free places, as users write them.
pub const SYMMETRIES: [&str; 4] = ["none", "x", "y", "both"];

const fn length(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(key, Kind::Quantity(Quantity::Length), meaning, example).within(1e-4, 10.0)
}

/// `[arrange]`.
pub static ARRANGE: Section = Section {
    name: "arrange",
    meaning: "what `ringsum arrange` may try for the first fastener group; nothing else reads it",
    shorthand: None,
    fields: &[
        field(
            "families",
            Kind::Choices(&FAMILIES),
            "patterns to try: along the edges, in columns and rows, on a circle, at free places",
            "[\"edge\", \"free\"]",
        )
        .default("all"),
        field(
            "bolts",
            Kind::Count,
            "fewest and most bolts, or their one number",
            "[4, 12]",
        )
        .default("[2, 12]"),
        field(
            "symmetry",
            Kind::Choice(&SYMMETRIES),
            "of free places: mirrored left to right (x), top to bottom (y), or both",
            "\"both\"",
        )
        .default("none"),
        length(
            "edge_distance",
            "least distance from the bolt axis to every plate edge",
            "\"8 mm\"",
        )
        .default("2 thread diameters"),
        length("pitch", "least distance between two bolt axes", "\"15 mm\"")
            .default("3 thread diameters"),
        length(
            "step",
            "lattice of free places, and step of margins and circles",
            "\"5 mm\"",
        )
        .default("a twelfth of the longer side of the first plate"),
        field(
            "keep_out",
            Kind::List(&KEEP_OUT),
            "zones that no head may reach into",
            "[{ centre = [\"40 mm\", \"30 mm\"], size = [\"20 mm\", \"10 mm\"] }]",
        )
        .default("none"),
        field(
            "sizes",
            Kind::List(&SIZE),
            "fasteners to try: each replaces what it states of the first fastener group",
            "[{ thread = \"M4\", hole = \"4.5 mm\", torque = \"1.3 N·m\" }]",
        )
        .default("the fastener as stated"),
    ],
};

/// One zone of `keep_out`.
pub static KEEP_OUT: Section = Section {
    name: "keep_out",
    meaning: "a zone that no head may reach into, in the coordinates of `at`",
    shorthand: None,
    fields: &[
        field(
            "centre",
            Kind::Point,
            "its centre",
            "[\"40 mm\", \"30 mm\"]",
        )
        .within(-100.0, 100.0)
        .required(),
        field(
            "size",
            Kind::Point,
            "width and height",
            "[\"20 mm\", \"10 mm\"]",
        )
        .within(1e-6, 100.0),
        field(
            "diameter",
            Kind::Quantity(Quantity::Length),
            "diameter of a round zone",
            "\"20 mm\"",
        )
        .within(1e-6, 100.0),
    ],
};

/// One of `sizes`.
pub static SIZE: Section = Section {
    name: "sizes",
    meaning: "a fastener to try: what it states replaces that of the first fastener group",
    shorthand: None,
    fields: &[
        THREAD,
        GRADE,
        HEAD,
        WASHER,
        NUT_WASHER,
        field(
            "hole",
            Kind::PerPlate(Measure::Quantity(Quantity::Length)),
            "hole diameter, for all plates, as a list of one for each or by plate name, `\"*\"` for the others",
            "\"4.5 mm\"",
        )
        .within(1e-5, 1.0),
        field(
            "torque",
            Kind::Table(&TORQUE),
            "tightening torque",
            "\"1.3 N·m\"",
        ),
    ],
};
