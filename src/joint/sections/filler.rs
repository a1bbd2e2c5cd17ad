//! Fields of fillers and of measurements.

use crate::{
    joint::fields::{Catalogue, Field, Kind, Measure, Section, field},
    units::Quantity,
};

const fn length(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(
        key,
        Kind::Spread(Measure::Quantity(Quantity::Length)),
        meaning,
        example,
    )
    .within(1e-8, 0.1)
}

const fn scatter(meaning: &'static str) -> Field {
    field(
        "scatter",
        Kind::Quantity(Quantity::Ratio),
        meaning,
        "\"20 %\"",
    )
    .within(0.0, 9.0)
}

/// `[[filler]]`.
pub static FILLER: Section = Section {
    name: "filler",
    meaning: "paste, film, pad or foil between the plates",
    shorthand: Some("name"),
    fields: &[
        field(
            "name",
            Kind::Name(Catalogue::Filler),
            "filler of the catalogue, or a name of your own with a model",
            "\"graphite foil\"",
        ),
        field(
            "between",
            Kind::Names,
            "plates between which it lies; a stack of more than two asks for them",
            "[\"base\", \"shim\"]",
        )
        .default("the two plates"),
        field(
            "model",
            Kind::Choice(&["fluid", "foil", "layer", "paste", "table"]),
            "how it conducts: liquid in the gaps, soft foil that yields, layer, paste that thins, measured table",
            "\"layer\"",
        ),
        field(
            "conductivity",
            Kind::Spread(Measure::Quantity(Quantity::Conductivity)),
            "conductivity of the filler",
            "\"3 W/(m·K)\"",
        )
        .within(1e-3, 5000.0),
        length(
            "thickness",
            "thickness of a layer in the joint",
            "\"0.5 mm\"",
        ),
        length(
            "bond_line",
            "stated bond line of a paste; with `model = \"layer\"` it is solid and fills no opening",
            "\"50 µm\"",
        ),
        field(
            "boundary",
            Kind::Spread(Measure::Quantity(Quantity::AreaResistance)),
            "resistance of both boundaries of a layer together",
            "\"0.1 K·cm²/W\"",
        )
        .within(0.0, 1.0)
        .default("0"),
        field(
            "modulus",
            Kind::Quantity(Quantity::Pressure),
            "pressure over strain of a layer pressed over its whole face; it then spreads an elastic field",
            "\"2 MPa\"",
        )
        .within(1e3, 1e12),
        field(
            "hardness",
            Kind::Quantity(Quantity::Pressure),
            "hardness of a foil that yields under the asperities of both faces",
            "\"9 MPa\"",
        )
        .within(1e4, 1e10),
        field(
            "table",
            Kind::Pairs([Quantity::Pressure, Quantity::AreaResistance]),
            "area resistance against pressure, pressure rising",
            "[[\"0 Pa\", \"1.2 K·cm²/W\"], [\"1 MPa\", \"0.5 K·cm²/W\"]]",
        ),
        field(
            "yield_stress",
            Kind::Quantity(Quantity::Pressure),
            "yield stress of a paste",
            "\"150 Pa\"",
        )
        .within(1e-3, 1e6),
        length(
            "thinnest",
            "thinnest bond line of a paste: its largest particle",
            "\"20 µm\"",
        )
        .default("20 µm"),
        length("applied", "thickness of a paste as applied", "\"100 µm\"").default("100 µm"),
        scatter("how far the resistance of the filler may be off, one standard deviation")
            .default("30 % for catalogue fillers, 20 % for your own"),
    ],
};

/// `[measured]`.
pub static MEASURED: Section = Section {
    name: "measured",
    meaning: "your own measurements of the contact: points or a force law",
    shorthand: None,
    fields: &[
        field(
            "points",
            Kind::Pairs([Quantity::Pressure, Quantity::FilmCoefficient]),
            "contact conductance against pressure, pressure rising",
            "[[\"1 MPa\", \"5000 W/(m²·K)\"], [\"10 MPa\", \"40000 W/(m²·K)\"]]",
        ),
        field(
            "law",
            Kind::Table(&MEASURED_LAW),
            "conductance of one bolt as a power of its force",
            "{ conductance = \"0.1 W/K\", force = \"1 kN\" }",
        ),
        scatter("how far the conductance may be off, one standard deviation").default("10 %"),
    ],
};

/// `law` of `[measured]`.
pub static MEASURED_LAW: Section = Section {
    name: "law",
    meaning: "G = conductance (F / force)^force_exponent (T / temperature)^temperature_exponent, or (M / torque)^torque_exponent",
    shorthand: None,
    fields: &[
        field(
            "conductance",
            Kind::Quantity(Quantity::Conductance),
            "conductance of one bolt at the reference",
            "\"0.1 W/K\"",
        )
        .within(1e-12, 1e9)
        .required(),
        field(
            "force",
            Kind::Quantity(Quantity::Force),
            "reference force",
            "\"1 kN\"",
        )
        .within(1e-3, 1e8),
        field(
            "torque",
            Kind::Quantity(Quantity::Torque),
            "reference torque of a bolt, in place of the force",
            "\"2 N·m\"",
        )
        .within(1e-6, 1e6),
        field(
            "torque_exponent",
            Kind::Number,
            "exponent of the torque",
            "1.0",
        )
        .within(-2.0, 5.0)
        .default("1"),
        field(
            "force_exponent",
            Kind::Number,
            "exponent of the force",
            "1.0",
        )
        .within(-2.0, 5.0)
        .default("1"),
        field(
            "temperature",
            Kind::Quantity(Quantity::Temperature),
            "reference temperature",
            "\"4.2 K\"",
        )
        .within(0.01, 2000.0)
        .default("the service temperature"),
        field(
            "temperature_exponent",
            Kind::Number,
            "exponent of the temperature",
            "1.3",
        )
        .within(-10.0, 10.0)
        .default("0"),
    ],
};
