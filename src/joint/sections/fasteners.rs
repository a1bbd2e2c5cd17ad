//! Fields of fasteners.

use crate::{
    joint::{
        fields::{Catalogue, Field, Kind, Measure, Section, field},
        sections::{AXIAL_LOAD, DISC_SPRINGS, ISOLATING},
    },
    units::Quantity,
};

const fn length(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(key, Kind::Quantity(Quantity::Length), meaning, example).within(1e-5, 100.0)
}

// What a size of a search may state as well.
pub(super) const THREAD: Field = field(
    "thread",
    Kind::Name(Catalogue::Thread),
    "thread: ISO metric or unified inch",
    "\"M4\"",
);
pub(super) const GRADE: Field = field(
    "grade",
    Kind::Name(Catalogue::Grade),
    "strength grade",
    "\"A2-70\"",
);
pub(super) const HEAD: Field = field(
    "head",
    Kind::Name(Catalogue::Head),
    "head type: hex, socket, pan, button, countersunk, or its standard",
    "\"socket\"",
);
pub(super) const WASHER: Field = field(
    "washer",
    Kind::Name(Catalogue::Washer),
    "washer under the head, by its standard, or \"none\"",
    "\"ISO 7089\"",
);
pub(super) const NUT_WASHER: Field = field(
    "nut_washer",
    Kind::Name(Catalogue::Washer),
    "washer under the nut, by its standard, or \"none\"",
    "\"ISO 7089\"",
);

/// `[[fastener]]`.
pub static FASTENER: Section = Section {
    name: "fastener",
    meaning: "a group of like bolts",
    shorthand: None,
    fields: &[
        THREAD
        .required(),
        GRADE
        .required(),
        HEAD,
        WASHER
        .default("none"),
        NUT_WASHER
        .default("none"),
        length(
            "bearing",
            "outer diameter of the seat of head and nut; overrides head and washer",
            "\"8.5 mm\"",
        ),
        field(
            "hole",
            Kind::PerPlate(Measure::Quantity(Quantity::Length)),
            "hole diameter, for all plates, as a list of one for each or by plate name, `\"*\"` for the others",
            "\"4.5 mm\"",
        )
        .within(1e-5, 1.0)
        .default("medium clearance hole of the thread"),
        field(
            "from",
            Kind::Text,
            "plate on which the heads sit",
            "\"base\"",
        )
        .default("the first plate"),
        field(
            "engagement",
            Kind::Table(&ENGAGEMENT),
            "how the far end holds",
            "{ kind = \"insert\", length = \"6 mm\" }",
        )
        .default("nut"),
        field(
            "torque",
            Kind::Table(&TORQUE),
            "tightening torque",
            "{ value = \"1.7 N·m\", tolerance = \"5 %\", running = \"0.15 N·m\" }",
        ),
        field(
            "preload",
            Kind::Spread(Measure::Quantity(Quantity::Force)),
            "clamp force of one bolt instead of a torque, or its range",
            "\"5 kN\"",
        )
        .within(1e-3, 1e8),
        field(
            "friction",
            Kind::Table(&FRICTION),
            "friction of thread and head",
            "{ class = \"B\" }",
        )
        .default("class B"),
        field(
            "method",
            Kind::Name(Catalogue::Method),
            "tightening method, whose scatter stands for friction and tool together",
            "\"torque wrench, friction estimated\"",
        ),
        field(
            "scatter",
            Kind::Quantity(Quantity::Ratio),
            "half-width of the scatter of the clamp force, friction and tool together",
            "\"25 %\"",
        )
        .within(0.0, 0.95),
        field(
            "shank_path",
            Kind::Flag,
            "whether the bolt itself carries heat",
            "true",
        )
        .default("true"),
        field(
            "isolating",
            Kind::Table(&ISOLATING),
            "isolating washers that keep the heat of the plates from the bolt",
            "{ material = \"G-10\", thickness = \"1 mm\" }",
        )
        .default("none"),
        field(
            "disc_springs",
            Kind::Table(&DISC_SPRINGS),
            "disc (Belleville) springs under the head or nut of each bolt",
            "{ outer = \"10 mm\", inner = \"5.2 mm\", thickness = \"0.5 mm\", cone_height = \"0.25 mm\", series = 4 }",
        )
        .default("none"),
        field(
            "split_washer",
            Kind::Flag,
            "whether a split spring washer lies under the head; it adds nothing to the force",
            "true",
        )
        .default("false"),
        field(
            "axial_load",
            Kind::Table(&AXIAL_LOAD),
            "load from outside along each bolt, pulling the plates apart, or its range",
            "\"500 N\"",
        )
        .default("none"),
        field(
            "at",
            Kind::Points,
            "places, from the lower left corner of the first plate (round: its centre; outline: as its points)",
            "[[\"7 mm\", \"7 mm\"], [\"80 mm\", \"7 mm\"]]",
        )
        .within(-100.0, 100.0),
        field(
            "pattern",
            Kind::Table(&PATTERN),
            "places by rule",
            "{ kind = \"grid\", count = [3, 2], margin = \"7 mm\" }",
        ),
        field(
            "count",
            Kind::Count,
            "number of bolts, as a check on the places",
            "4",
        ),
    ],
};

/// `engagement` of a fastener.
pub static ENGAGEMENT: Section = Section {
    name: "engagement",
    meaning: "how the far end of a bolt holds",
    shorthand: Some("kind"),
    fields: &[
        field(
            "kind",
            Kind::Choice(&["nut", "tapped", "insert"]),
            "a nut, a thread in the far plate, or an insert in it",
            "\"nut\"",
        )
        .required(),
        length("length", "engaged length of thread", "\"6 mm\"")
            .within(1e-4, 1.0)
            .default("thickness of the far plate; insert: 1.5 thread diameters"),
        length(
            "flange",
            "inserts only: outer diameter of the flange on the faying face; in a sandwich it carries the clamp force",
            "\"14 mm\"",
        ),
        length(
            "proud",
            "inserts only: height of the flange above the face around it",
            "\"0.05 mm\"",
        )
        .within(0.0, 0.01)
        .default("0 mm, flush"),
        field(
            "pull_out",
            Kind::Quantity(Quantity::Force),
            "inserts only: pull-out load by the maker or a test",
            "\"9 kN\"",
        )
        .within(1e-3, 1e8),
        length(
            "outer",
            "inserts only: outer diameter of the insert's own thread in the plate",
            "\"6.5 mm\"",
        ),
    ],
};

/// `torque` of a fastener.
pub static TORQUE: Section = Section {
    name: "torque",
    meaning: "tightening torque",
    shorthand: Some("value"),
    fields: &[
        field(
            "value",
            Kind::Spread(Measure::Quantity(Quantity::Torque)),
            "torque at the wrench, running torque included; with a spread it states the tolerance",
            "\"1.7 N·m\"",
        )
        .within(1e-6, 1e6)
        .required(),
        field(
            "tolerance",
            Kind::Quantity(Quantity::Ratio),
            "tolerance of the tool",
            "\"5 %\"",
        )
        .within(0.0, 0.95)
        .default("5 %"),
        field(
            "running",
            Kind::Spread(Measure::Quantity(Quantity::Torque)),
            "running torque of a locking feature, or its range",
            "\"0.15 N·m\"",
        )
        .within(0.0, 1e6)
        .default("0 N·m"),
    ],
};

/// `friction` of a fastener.
pub static FRICTION: Section = Section {
    name: "friction",
    meaning: "friction: a class, thread and head, or a nut factor",
    shorthand: Some("class"),
    fields: &[
        field(
            "class",
            Kind::Name(Catalogue::Friction),
            "friction class or pair of the catalogue",
            "\"B\"",
        ),
        field(
            "thread",
            Kind::Spread(Measure::Number),
            "coefficient between the threads, or its range",
            "[0.08, 0.16]",
        )
        .within(0.01, 1.5),
        field(
            "head",
            Kind::Spread(Measure::Number),
            "coefficient under the turned head or nut, or its range",
            "[0.08, 0.16]",
        )
        .within(0.01, 1.5)
        .default("as in the thread"),
        field(
            "nut_factor",
            Kind::SpreadOr(Catalogue::NutFactor),
            "nut factor K of T = K d F, its range, or a condition of the catalogue",
            "[0.16, 0.2, 0.24]",
        )
        .within(0.02, 2.0),
    ],
};

/// `pattern` of a fastener.
pub static PATTERN: Section = Section {
    name: "pattern",
    meaning: "places by rule: grid (count with margin, or first and pitch), edge (count with margin), circle (count, diameter)",
    shorthand: None,
    fields: &[
        field(
            "kind",
            Kind::Choice(&["grid", "edge", "circle"]),
            "columns and rows; along the edges; on a circle",
            "\"grid\"",
        )
        .required(),
        field(
            "count",
            Kind::Count,
            "bolts along width and height, `[3, 2]`; on a circle or round edge their number",
            "[3, 2]",
        )
        .required(),
        length(
            "margin",
            "distance of the outer bolts from the edge of the first plate",
            "\"7 mm\"",
        ),
        field(
            "first",
            Kind::Point,
            "the lower left bolt of a grid",
            "[\"7 mm\", \"7 mm\"]",
        )
        .within(-100.0, 100.0),
        field(
            "pitch",
            Kind::Point,
            "distance of columns and of rows",
            "[\"40 mm\", \"30 mm\"]",
        )
        .within(1e-5, 100.0),
        length("diameter", "diameter of the bolt circle", "\"50 mm\""),
        field(
            "centre",
            Kind::Point,
            "centre of the bolt circle",
            "[\"40 mm\", \"40 mm\"]",
        )
        .within(-100.0, 100.0)
        .default("the centre of the first plate"),
        field(
            "start",
            Kind::Quantity(Quantity::Angle),
            "angle of the first bolt from the x axis, anticlockwise",
            "\"0 °\"",
        )
        .within(-7.0, 7.0)
        .default("0 °"),
    ],
};
