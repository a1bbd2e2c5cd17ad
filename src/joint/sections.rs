//! The fields of the joint file, part by part: the file itself, service, contact, measured, losses.

mod arrange;
mod fasteners;
mod filler;
mod heat;
mod loads;
mod plates;
mod sandwich;

use crate::{
    joint::{
        MOST_PLATES,
        fields::{Catalogue, Field, Kind, Measure, Section, field},
        tree::Node,
    },
    units::Quantity,
};

pub use arrange::{ARRANGE, KEEP_OUT, SIZE};
pub use fasteners::{ENGAGEMENT, FASTENER, FRICTION, PATTERN, TORQUE};
pub use filler::{FILLER, MEASURED, MEASURED_LAW};
pub use heat::{CONDUCTIVITY, COOLED, HEATED, ISOLATING, RADIATION};
pub use loads::{AXIAL_LOAD, DISC_SPRINGS};
pub use plates::{
    BIMETAL, BOW, CUTOUT, FEET, FINISH, FOOT, MATERIAL, MATERIAL_INLINE, MICROHARDNESS, PLATE,
    PLATING, RIB, SAG,
};
pub use sandwich::SANDWICH;

/// The newest format this version reads.
pub const FORMAT: usize = 1;

/// Names of two plates that state none, in file order.
const PLATE_NAMES: [&str; 2] = ["upper", "lower"];

/// Names of more plates than two that state none, in file order.
const STACK_NAMES: [&str; MOST_PLATES] = ["first", "second", "third", "fourth", "fifth", "sixth"];

/// Name of a plate that states none, by its place among all.
pub(super) fn plate_name((index, count): (usize, usize)) -> Option<&'static str> {
    if count > PLATE_NAMES.len() {
        STACK_NAMES.get(index).copied()
    } else {
        PLATE_NAMES.get(index).copied()
    }
}

/// Name by which other parts of the file and overrides call a table; that of a filler says what it
/// is made of and calls nothing.
pub(super) fn own_name<'n>(node: &'n Node, section: &Section) -> Option<&'n str> {
    if section.name == FILLER.name {
        None
    } else {
        node.text_of("name")
    }
}

/// Name of a table that states none, by its place in its list.
pub(super) fn default_name(section: &Section, place: (usize, usize)) -> Option<&'static str> {
    if section.name == PLATE.name {
        plate_name(place)
    } else {
        None
    }
}

/// The joint file.
pub static FILE: Section = Section {
    name: "",
    meaning: "a bolted joint of two plates or a stack of more",
    shorthand: None,
    fields: &[
        field(
            "format",
            Kind::Count,
            "version of the file format",
            "1",
        )
        .default("1"),
        field(
            "title",
            Kind::Text,
            "title, as reports print it",
            "\"Converter box on shear panel\"",
        )
        .default("Bolted joint"),
        field(
            "service",
            Kind::Table(&SERVICE),
            "medium, temperatures, heat and what is required",
            "{ medium = \"vacuum\", temperature = \"20 °C\", heat = \"22 W\" }",
        )
        .required(),
        field(
            "material",
            Kind::List(&MATERIAL),
            "a material of your own, or a catalogue material with changes",
            "[{ name = \"my plate\", like = \"Al 6061-T6\", conductivity = \"160 W/(m·K)\" }]",
        ),
        field(
            "plate",
            Kind::List(&PLATE),
            "the plates, warm side first; two to six",
            "[{ material = \"Al 6061-T6\", thickness = \"5 mm\", size = [\"80 mm\", \"80 mm\"], finish = \"milled\" }]",
        )
        .required(),
        field(
            "contact",
            Kind::Table(&CONTACT),
            "how the faces touch",
            "{ law = \"elastic-plastic\" }",
        ),
        field(
            "fastener",
            Kind::List(&FASTENER),
            "the bolts; one table for each group of like bolts",
            "[{ thread = \"M4\", grade = \"A2-70\", head = \"socket\", torque = \"1.7 N·m\", at = [[\"40 mm\", \"40 mm\"]] }]",
        )
        .required(),
        field(
            "filler",
            Kind::List(&FILLER),
            "paste, film, pad or foil between the plates; one table for each interface that has one",
            "[{ name = \"graphite foil\" }]",
        )
        .default("none: bare faces"),
        field(
            "measured",
            Kind::Table(&MEASURED),
            "your own measurements of the contact, which override the laws",
            "{ points = [[\"1 MPa\", \"5000 W/(m²·K)\"], [\"10 MPa\", \"40000 W/(m²·K)\"]] }",
        ),
        field(
            "losses",
            Kind::Table(&LOSSES),
            "losses of clamp force that the nominal result shall carry",
            "{ settling = \"guide\", relaxation = \"5 %\" }",
        )
        .default("none in the nominal force"),
        field(
            "arrange",
            Kind::Table(&ARRANGE),
            "what `ringsum arrange` may try for the first fastener group; nothing else reads it",
            "{ bolts = [4, 12], symmetry = \"both\" }",
        ),
        field(
            "uncertainty",
            Kind::Table(&UNCERTAINTY),
            "how inputs scatter together",
            "{ bolts = \"independent\" }",
        ),
        field(
            "cost",
            Kind::Number,
            "what the joint costs, in any measure of your own, for `compare`",
            "3.5",
        )
        .within(0.0, 1e12),
        field(
            "variant",
            Kind::Variants,
            "other versions of the joint for `compare`: a name, and every field that differs by its path",
            "[{ name = \"tighter\", fastener.torque.value = \"2 N·m\" }]",
        ),
    ],
};

/// `[service]`.
pub static SERVICE: Section = Section {
    name: "service",
    meaning: "medium, temperatures, heat and what is required",
    shorthand: None,
    fields: &[
        field(
            "medium",
            Kind::Name(Catalogue::Medium),
            "what surrounds the joint",
            "\"vacuum\"",
        )
        .required(),
        field(
            "pressure",
            Kind::Spread(Measure::Quantity(Quantity::Pressure)),
            "absolute pressure of the gas, or its range",
            "\"101325 Pa\"",
        )
        .within(1e-9, 1e8)
        .default("101 325 Pa"),
        field(
            "temperature",
            Kind::Table(&TEMPERATURE),
            "mean temperature of the sink surface, or the cases hot and cold",
            "\"20 °C\"",
        )
        .default("20 °C"),
        field(
            "heat",
            Kind::Spread(Measure::Quantity(Quantity::Power)),
            "heat through the joint, or its range: it moves the rises; properties and sag are those of the nominal heat",
            "\"22 W\"",
        )
        .within(1e-12, 1e7)
        .default("the sum of the heated zones that state theirs"),
        field(
            "require",
            Kind::Table(&REQUIRE),
            "the limit the joint must meet",
            "{ rise = \"5 K\" }",
        ),
    ],
};

/// `[service.temperature]`.
pub static TEMPERATURE: Section = Section {
    name: "temperature",
    meaning: "mean temperature of the sink surface",
    shorthand: Some("sink"),
    fields: &[
        temperature("sink", "mean temperature of the sink surface", "\"20 °C\""),
        temperature("hot", "the same in the hot case", "\"50 °C\""),
        temperature("cold", "the same in the cold case", "\"-20 °C\""),
        temperature(
            "assembly",
            "temperature at which the bolts were tightened",
            "\"20 °C\"",
        )
        .default("20 °C"),
    ],
};

const fn temperature(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(key, Kind::Quantity(Quantity::Temperature), meaning, example).within(0.01, 2000.0)
}

/// Words of `of` for a rise; the first is the default.
pub const RISES: [&str; 3] = ["mean", "hottest", "interface"];
/// Words of `of` for a resistance or conductance; the last is the default.
pub const PLANES: [&str; 4] = [
    "contact",
    "node to node",
    "added by joint",
    "source to sink",
];

/// `[service.require]`.
pub static REQUIRE: Section = Section {
    name: "require",
    meaning: "the limit the joint must meet: exactly one of rise, resistance, conductance",
    shorthand: None,
    fields: &[
        field(
            "rise",
            Kind::Quantity(Quantity::TemperatureDifference),
            "limit of the temperature above the mean sink surface",
            "\"5 K\"",
        )
        .within(1e-9, 5000.0),
        field(
            "resistance",
            Kind::Quantity(Quantity::Resistance),
            "limit of a resistance",
            "\"0.3 K/W\"",
        )
        .within(1e-12, 1e9),
        field(
            "conductance",
            Kind::Quantity(Quantity::Conductance),
            "limit of a conductance",
            "\"5 W/K\"",
        )
        .within(1e-12, 1e9),
        field(
            "of",
            Kind::Choice(&[
                "mean",
                "hottest",
                "interface",
                "contact",
                "node to node",
                "added by joint",
                "source to sink",
            ]),
            "which rise, or between which planes",
            "\"hottest\"",
        )
        .default("mean for a rise, source to sink otherwise"),
        field(
            "above",
            Kind::Choice(&["sink surface", "coolant"]),
            "from where a rise counts: the mean sink surface, or the coolant behind the films, which are all at one temperature",
            "\"coolant\"",
        )
        .default("sink surface"),
        field(
            "bound",
            Kind::Choice(&["most", "least"]),
            "the side of the limit on which the value must lie",
            "\"most\"",
        )
        .default("most for rise and resistance, least for conductance"),
    ],
};

/// `[contact]`.
pub static CONTACT: Section = Section {
    name: "contact",
    meaning: "how the faces touch",
    shorthand: None,
    fields: &[
        field(
            "law",
            Kind::Choice(&["elastic-plastic", "plastic", "elastic", "plastic-power"]),
            "law of the solid spots",
            "\"elastic-plastic\"",
        )
        .default("elastic-plastic"),
        field(
            "cone",
            Kind::QuantityOr(Quantity::Angle, &["fitted", "vdi"]),
            "rule for the extent of contact, or a half-angle",
            "\"fitted\"",
        )
        .within(0.017, 1.5)
        .default("fitted"),
        field(
            "shape",
            Kind::Choice(&["fitted", "uniform", "linear", "polynomial"]),
            "shape of the pressure between hole and contact edge",
            "\"linear\"",
        )
        .default("fitted for the fitted cone, linear for the others"),
        field(
            "head_model",
            Kind::Choice(&["uniform", "rigid"]),
            "how the head presses",
            "\"uniform\"",
        )
        .default("uniform"),
        field(
            "faces",
            Kind::Choice(&["frictionless", "stuck"]),
            "whether the faces slide on each other",
            "\"frictionless\"",
        )
        .default("frictionless"),
        field(
            "compliance",
            Kind::Choice(&["hard", "asperities"]),
            "what yields between the faces",
            "\"hard\"",
        )
        .default("hard"),
        field(
            "scatter",
            Kind::Quantity(Quantity::Ratio),
            "how far the law of the solid spots may be off, one standard deviation",
            "\"15 %\"",
        )
        .within(0.0, 9.0)
        .default("15 %"),
        field(
            "emissivity",
            Kind::PerPlate(Measure::Number),
            "hemispherical emissivity of the faces: of all plates, as a list of one for each or by plate name, `\"*\"` for the others",
            "0.1",
        )
        .within(0.001, 1.0)
        .default("0.1 for bare metal, 0.8 otherwise"),
    ],
};

/// `[losses]`.
pub static LOSSES: Section = Section {
    name: "losses",
    meaning: "losses of clamp force that the nominal result shall carry",
    shorthand: None,
    fields: &[
        field(
            "settling",
            Kind::SpreadOrWord(Quantity::Length, &["guide"]),
            "sum of settling over all contacts of one bolt, or its range",
            "\"guide\"",
        )
        .within(0.0, 1e-3)
        .default("guide values"),
        field(
            "relaxation",
            Kind::Spread(Measure::Quantity(Quantity::Ratio)),
            "short-term relaxation of the clamp force, or its range",
            "\"5 %\"",
        )
        .within(0.0, 0.9)
        .default("5 %"),
        field(
            "retightened",
            Kind::Flag,
            "whether the bolts are tightened to the full torque again after settling, which then ends settling and short-term relaxation",
            "true",
        )
        .default("false"),
        field(
            "long_term",
            Kind::Spread(Measure::Quantity(Quantity::Ratio)),
            "relaxation in service beyond the short term, as a share of the clamp force, or its range",
            "\"3 %\"",
        )
        .within(0.0, 0.9)
        .default("none"),
        field(
            "per_decade",
            Kind::Spread(Measure::Quantity(Quantity::Ratio)),
            "the same for every decade of time, in place of long_term",
            "\"1 %\"",
        )
        .within(0.0, 0.2),
        field(
            "decades",
            Kind::Number,
            "decades of time in service after the first hour, with per_decade: 4 is 10 000 h",
            "4",
        )
        .within(0.0, 8.0),
        field(
            "interaction",
            Kind::Quantity(Quantity::Ratio),
            "what a bolt loses while the others are tightened after it",
            "\"5 %\"",
        )
        .within(0.0, 0.9)
        .default("5 % where several bolts clamp, 10 % on a soft layer"),
    ],
};

/// `[uncertainty]`.
pub static UNCERTAINTY: Section = Section {
    name: "uncertainty",
    meaning: "how inputs scatter together",
    shorthand: None,
    fields: &[field(
        "bolts",
        Kind::QuantityOr(Quantity::Ratio, &["one lot", "independent"]),
        "whether friction and preload of all bolts lie alike or each for itself, or the share of their variance that is a bolt's own",
        "\"independent\"",
    )
    .within(0.0, 1.0)
    .default("one lot")],
};
