//! Fields of heat: zones that are heated, parts that are cooled.

use crate::{
    joint::fields::{Field, Kind, Measure, Section, field},
    units::Quantity,
};

const fn centre(meaning: &'static str) -> Field {
    field("centre", Kind::Point, meaning, "[\"80 mm\", \"60 mm\"]")
        .within(-100.0, 100.0)
        .default("the centre of the plate")
}

const fn size(meaning: &'static str) -> Field {
    field("size", Kind::Point, meaning, "[\"60 mm\", \"60 mm\"]").within(1e-5, 100.0)
}

const fn diameter(meaning: &'static str) -> Field {
    field(
        "diameter",
        Kind::Quantity(Quantity::Length),
        meaning,
        "\"20 mm\"",
    )
    .within(1e-5, 100.0)
}

/// One of the `heated` zones of the first plate.
pub static HEATED: Section = Section {
    name: "heated",
    meaning: "where heat enters the outer face of the first plate; of several zones each states its heat, and where they overlap fluxes add",
    shorthand: None,
    fields: &[
        centre("centre of the heated zone"),
        size("width and height of the heated zone"),
        diameter("diameter of a round heated zone"),
        field(
            "heat",
            Kind::Quantity(Quantity::Power),
            "heat that enters here; the heat of the joint is the sum",
            "\"12 W\"",
        )
        .within(1e-12, 1e7)
        .default("the heat of the service, where there is one zone"),
        field(
            "face",
            Kind::Choice(&["flux", "isothermal"]),
            "uniform flux, or one temperature over a zone that stands alone",
            "\"isothermal\"",
        )
        .default("flux"),
    ],
};

/// One of the `cooled` parts of the last plate.
pub static COOLED: Section = Section {
    name: "cooled",
    meaning: "where heat leaves the second plate: one of film, temperature, face, edge, radiation; several tables are all cooled to one temperature",
    shorthand: None,
    fields: &[
        field(
            "film",
            Kind::Spread(Measure::Quantity(Quantity::FilmCoefficient)),
            "heat transfer coefficient on the whole back or on a zone of it, such as the strip of a channel",
            "\"500 W/(m²·K)\"",
        )
        .within(1e-3, 1e8),
        field(
            "temperature",
            Kind::Quantity(Quantity::Temperature),
            "temperature of the whole back or of a zone of it, such as the strip of a heat pipe",
            "\"20 °C\"",
        )
        .within(0.01, 2000.0),
        field(
            "face",
            Kind::Choice(&["isothermal"]),
            "the whole back or a zone of it at one temperature, that of the service",
            "\"isothermal\"",
        ),
        field(
            "edge",
            Kind::Choices(&["rim", "left", "right", "lower", "upper", "all"]),
            "the rim of a round plate, or edges of a rectangular one as seen in plan (x to the right, y up), at one temperature over their thickness",
            "\"rim\"",
        ),
        field(
            "radiation",
            Kind::Table(&RADIATION),
            "the whole back radiates; alone or beside films on the whole back",
            "{ emissivity = 0.8 }",
        ),
        centre("centre of the cooled zone, in the plate's own coordinates"),
        size("width and height of the cooled zone; a channel or heat pipe is a narrow one"),
        diameter("diameter of a round cooled zone"),
    ],
};

/// `radiation` of a cooled back.
pub static RADIATION: Section = Section {
    name: "radiation",
    meaning: "radiation from the back, linear about the mean sink surface",
    shorthand: Some("emissivity"),
    fields: &[
        field(
            "emissivity",
            Kind::Number,
            "hemispherical emissivity of the back",
            "0.8",
        )
        .within(0.001, 1.0)
        .required(),
        field(
            "temperature",
            Kind::Quantity(Quantity::Temperature),
            "temperature of the surroundings, from which with the heat that of the sink surface follows; in place of the temperature of the service",
            "\"-60 °C\"",
        )
        .within(0.01, 2000.0)
        .default("what the heat and the temperature of the sink surface ask for"),
    ],
};

/// `conductivity` of a plate.
pub static CONDUCTIVITY: Section = Section {
    name: "conductivity",
    meaning: "conductivity of a plate that differs in its plane and through it",
    shorthand: None,
    fields: &[
        conductivity("in_plane", "in the plane of the plate", "\"400 W/(m·K)\"").required(),
        conductivity(
            "through",
            "through the thickness of the plate",
            "\"5 W/(m·K)\"",
        )
        .required(),
    ],
};

const fn conductivity(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(
        key,
        Kind::Spread(Measure::Quantity(Quantity::Conductivity)),
        meaning,
        example,
    )
    .within(1e-3, 1e5)
}

/// `isolating` of a fastener.
pub static ISOLATING: Section = Section {
    name: "isolating",
    meaning: "isolating washers between plate and head or nut; a bush around the shank changes nothing here, since no shank touches its hole",
    shorthand: None,
    fields: &[
        field(
            "material",
            Kind::Table(&crate::joint::sections::MATERIAL_INLINE),
            "material of the washers by name, or a table as in [[material]]",
            "\"G-10\"",
        )
        .required(),
        field(
            "thickness",
            Kind::Quantity(Quantity::Length),
            "thickness of each washer",
            "\"1 mm\"",
        )
        .within(1e-5, 0.1)
        .required(),
        field(
            "under",
            Kind::Choice(&["head", "nut", "both"]),
            "where they lie",
            "\"both\"",
        )
        .default("both with a nut, else the head"),
    ],
};
