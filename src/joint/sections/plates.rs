//! Fields of plates, materials and faces.

use crate::{
    joint::{
        fields::{Catalogue, Field, Kind, Measure, Section, field},
        sections::{CONDUCTIVITY, COOLED, HEATED, SANDWICH},
    },
    units::Quantity,
};

const fn length(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    field(key, Kind::Quantity(Quantity::Length), meaning, example).within(1e-5, 100.0)
}

/// A length that may carry its spread.
const fn spread(key: &'static str, meaning: &'static str, example: &'static str) -> Field {
    let kind = Kind::Spread(Measure::Quantity(Quantity::Length));
    field(key, kind, meaning, example)
}

/// `[[plate]]`.
pub static PLATE: Section = Section {
    name: "plate",
    meaning: "one of the plates, warm side first",
    shorthand: None,
    fields: &[
        field(
            "name",
            Kind::Text,
            "name by which other tables and results call the plate",
            "\"panel\"",
        )
        .default("upper and lower; of more than two first, second, third and so on"),
        field(
            "material",
            Kind::Table(&MATERIAL_INLINE),
            "material by name, or a table as in [[material]]",
            "\"Al 6061-T6\"",
        )
        .required(),
        field(
            "conductivity",
            Kind::Table(&CONDUCTIVITY),
            "conductivity in the plane and through the thickness where they differ, in place of the material's",
            "{ in_plane = \"400 W/(m·K)\", through = \"5 W/(m·K)\" }",
        ),
        field(
            "flexural_strength",
            Kind::Quantity(Quantity::Pressure),
            "strength in bending of a plate of ceramic, glass or a semiconductor",
            "\"300 MPa\"",
        )
        .within(1e5, 1e11),
        spread("thickness", "thickness, or its range", "\"5 mm\"")
            .within(1e-6, 10.0)
            .required(),
        field(
            "sandwich",
            Kind::Table(&SANDWICH),
            "first or last plate only: two face sheets of the plate's material on a core; bolts end in inserts",
            "{ face_sheet = \"0.5 mm\", core_conductivity = \"1.2 W/(m·K)\" }",
        )
        .default("solid"),
        field(
            "size",
            Kind::Point,
            "width and height of a rectangular plate",
            "[\"160 mm\", \"120 mm\"]",
        )
        .within(1e-5, 100.0),
        length("diameter", "diameter of a round plate", "\"60 mm\""),
        OUTLINE,
        field(
            "cutouts",
            Kind::List(&CUTOUT),
            "openings through the plate, in its own coordinates",
            "[{ centre = [\"40 mm\", \"30 mm\"], diameter = \"12 mm\" }]",
        ),
        field(
            "feet",
            Kind::Table(&FEET),
            "pads under the faying face, in the plate's own coordinates: only they touch",
            "{ height = \"3 mm\", at = [{ centre = [\"10 mm\", \"10 mm\"], diameter = \"16 mm\" }] }",
        )
        .default("none: the whole face"),
        field(
            "ribs",
            Kind::List(&RIB),
            "ribs and walls on the outer face, in the plate's own coordinates",
            "[{ centre = [\"40 mm\", \"30 mm\"], size = [\"4 mm\", \"50 mm\"], height = \"12 mm\" }]",
        ),
        field(
            "offset",
            Kind::Point,
            "not of the first plate: where the corner (round: the centre; outline: the origin of its points) of the plate above lies on it",
            "[\"70 mm\", \"90 mm\"]",
        )
        .within(-100.0, 100.0)
        .default("plates centred on each other"),
        field(
            "finish",
            Kind::Table(&FINISH),
            "the faying face: a process, or a table; of a plate between others both faces",
            "{ roughness = \"Ra 0.8 µm\", flatness = \"0.1 mm\" }",
        )
        .required(),
        field(
            "finish_below",
            Kind::Table(&FINISH),
            "plate between others only: its face towards the cold side, where it differs from `finish`",
            "{ roughness = \"Ra 1.6 µm\", plating = \"anodic film\" }",
        )
        .default("as finish"),
        field(
            "emissivity",
            Kind::Spread(Measure::Number),
            "hemispherical emissivity of the faying face",
            "0.1",
        )
        .within(0.001, 1.0)
        .default("0.1 for bare metal, 0.8 otherwise"),
        field(
            "bow",
            Kind::Table(&BOW),
            "known bow of the faying face; a plate between others is bent as a whole, as its face towards the warm side shows it",
            "{ kind = \"concave\", height = \"30 µm\" }",
        ),
        field(
            "flatness_map",
            Kind::Text,
            "measured heights of the faying face, in place of bow: a table beside this file with the header `x [mm], y [mm], z [µm]`, z positive towards the other plate",
            "\"panel_flatness.csv\"",
        ),
        field(
            "sag",
            Kind::Table(&SAG),
            "curvature that temperatures give the plate: one of flux, curvature, bimetal",
            "{ flux = \"20 kW/m²\" }",
        ),
        length(
            "hole",
            "hole diameter in this plate, where it differs from that of the fastener",
            "\"4.5 mm\"",
        ),
        field(
            "heated",
            Kind::List(&HEATED),
            "first plate only: where heat enters the outer face; one zone, or several with their heat",
            "{ centre = [\"80 mm\", \"60 mm\"], size = [\"60 mm\", \"60 mm\"] }",
        )
        .default("uniform flux on the whole outer face"),
        field(
            "cooled",
            Kind::List(&COOLED),
            "last plate only: where heat leaves; one table, or several cooled to one temperature",
            "{ film = \"500 W/(m²·K)\" }",
        )
        .default("the whole back at one temperature"),
    ],
};

const OUTLINE: Field = field(
    "outline",
    Kind::Points,
    "corners of an outline, in its own coordinates, either way round; it closes by itself",
    "[[\"0 mm\", \"0 mm\"], [\"80 mm\", \"0 mm\"], [\"80 mm\", \"40 mm\"], [\"0 mm\", \"60 mm\"]]",
)
.within(-100.0, 100.0);

const CENTRE: Field = field(
    "centre",
    Kind::Point,
    "centre, in the plate's own coordinates",
    "[\"40 mm\", \"30 mm\"]",
)
.within(-100.0, 100.0);

const SIZE: Field = field(
    "size",
    Kind::Point,
    "width and height of a rectangle",
    "[\"20 mm\", \"10 mm\"]",
)
.within(1e-5, 100.0);

const DIAMETER: Field = length("diameter", "diameter of a disc", "\"12 mm\"");

/// One of the `cutouts` of a plate.
pub static CUTOUT: Section = Section {
    name: "cutout",
    meaning: "an opening through a plate: size or diameter about a centre, or an outline",
    shorthand: None,
    fields: &[CENTRE, SIZE, DIAMETER, OUTLINE],
};

/// `feet` of a plate.
pub static FEET: Section = Section {
    name: "feet",
    meaning: "pads under the faying face; only they touch",
    shorthand: None,
    fields: &[
        length(
            "height",
            "how far the pads stand out of the face",
            "\"3 mm\"",
        )
        .required(),
        field(
            "at",
            Kind::List(&FOOT),
            "the pads",
            "[{ centre = [\"10 mm\", \"10 mm\"], diameter = \"16 mm\" }]",
        )
        .required(),
    ],
};

/// One of the pads of `feet`.
pub static FOOT: Section = Section {
    name: "foot",
    meaning: "a pad: size or diameter about a centre, or an outline",
    shorthand: None,
    fields: &[CENTRE, SIZE, DIAMETER, OUTLINE],
};

/// One of the `ribs` of a plate.
pub static RIB: Section = Section {
    name: "rib",
    meaning: "a part of larger thickness: size or diameter about a centre, or an outline",
    shorthand: None,
    fields: &[
        CENTRE,
        SIZE,
        DIAMETER,
        OUTLINE,
        length(
            "height",
            "how far it stands out of the outer face",
            "\"12 mm\"",
        )
        .required(),
    ],
};

/// `sag` of a plate.
pub static SAG: Section = Section {
    name: "sag",
    meaning: "what curves a plate: one of flux, curvature, bimetal",
    shorthand: None,
    fields: &[
        field(
            "flux",
            Kind::QuantityOr(Quantity::HeatFlux, &["heat"]),
            "heat flux through the thickness, from the first plate to the second, or \"heat\": that of the service over the area of the plate; it lifts the centre of the first plate (concave at the faying face) and domes the second towards it (convex)",
            "\"20 kW/m²\"",
        )
        .within(-1e9, 1e9),
        field(
            "curvature",
            Kind::Quantity(Quantity::Curvature),
            "the curvature itself: positive is concave at the faying face, open in the middle",
            "\"0.02 1/m\"",
        )
        .within(-10.0, 10.0),
        field(
            "bimetal",
            Kind::Table(&BIMETAL),
            "a second layer bonded to the outer face; one that grows more than the plate makes the faying face concave",
            "{ material = \"Cu OFHC\", thickness = \"0.5 mm\", change = \"40 K\" }",
        ),
    ],
};

/// `bimetal` of a sag.
pub static BIMETAL: Section = Section {
    name: "bimetal",
    meaning: "a layer bonded to the outer face",
    shorthand: None,
    fields: &[
        field(
            "material",
            Kind::Table(&MATERIAL_INLINE),
            "material of the layer by name, or a table as in [[material]]",
            "\"Cu OFHC\"",
        )
        .required(),
        length("thickness", "thickness of the layer", "\"0.5 mm\"")
            .within(1e-7, 1.0)
            .required(),
        field(
            "change",
            Kind::Quantity(Quantity::TemperatureDifference),
            "change of temperature since both were flat together; negative when colder",
            "\"40 K\"",
        )
        .within(-2000.0, 2000.0)
        .required(),
    ],
};

/// `finish` of a plate.
pub static FINISH: Section = Section {
    name: "finish",
    meaning: "the faying face of a plate",
    shorthand: Some("process"),
    fields: &[
        field(
            "process",
            Kind::Name(Catalogue::Finish),
            "finishing process, from which typical roughness and its range follow",
            "\"milled\"",
        ),
        field(
            "roughness",
            Kind::Spread(Measure::Roughness),
            "roughness of the face, or its range",
            "\"Ra 0.8 µm\"",
        )
        .within(1e-9, 1e-3),
        field(
            "slope",
            Kind::Spread(Measure::Number),
            "root-mean-square slope of the asperities",
            "0.11",
        )
        .within(1e-3, 2.0)
        .default("from the roughness: 0.125 (Rq / 1 µm)^0.402"),
        spread(
            "flatness",
            "total out-of-flatness of the face, or its range",
            "\"0.1 mm\"",
        )
        .within(0.0, 0.1)
        .default("flat"),
        field(
            "plating",
            Kind::Table(&PLATING),
            "plating or film on the face, or \"none\"",
            "\"none\"",
        )
        .default("none"),
    ],
};

/// `plating` of a finish.
pub static PLATING: Section = Section {
    name: "plating",
    meaning: "a plating or film",
    shorthand: Some("name"),
    fields: &[
        field(
            "name",
            Kind::Name(Catalogue::Plating),
            "plating or film",
            "\"silver\"",
        )
        .required(),
        length("thickness", "thickness", "\"5 µm\"")
            .within(1e-9, 5e-3)
            .default("typical of the plating"),
    ],
};

/// `bow` of a plate.
pub static BOW: Section = Section {
    name: "bow",
    meaning: "a known bow, a paraboloid over the half diagonal (round: the radius)",
    shorthand: None,
    fields: &[
        field(
            "kind",
            Kind::Choice(&["concave", "convex"]),
            "concave is open at the centre when laid on a flat",
            "\"concave\"",
        )
        .required(),
        spread("height", "height of the bow, or its range", "\"30 µm\"")
            .within(0.0, 0.1)
            .required(),
    ],
};

/// `[[material]]`.
pub static MATERIAL: Section = Section {
    name: "material",
    meaning: "a material of your own, or a catalogue material with changes",
    shorthand: None,
    fields: &MATERIAL_FIELDS,
};

/// `material` of a plate.
pub static MATERIAL_INLINE: Section = Section {
    name: "material",
    meaning: "the material of a plate",
    shorthand: Some("like"),
    fields: &MATERIAL_FIELDS,
};

/// Kinds of material.
pub const MATERIAL_KINDS: [&str; 4] = ["metal", "brittle", "polymer", "graphite"];

static MATERIAL_FIELDS: [Field; 16] = [
    field("name", Kind::Text, "name", "\"my plate\""),
    field(
        "like",
        Kind::Name(Catalogue::Material),
        "material to start from",
        "\"Al 6061-T6\"",
    ),
    field(
        "kind",
        Kind::Choice(&MATERIAL_KINDS),
        "kind of solid",
        "\"metal\"",
    )
    .default("metal"),
    field(
        "family",
        Kind::Text,
        "family for galvanic pairing",
        "\"aluminium\"",
    ),
    field(
        "conductivity",
        Kind::Spread(Measure::Quantity(Quantity::Conductivity)),
        "thermal conductivity, or its range",
        "\"167 W/(m·K)\"",
    )
    .within(1e-3, 1e5),
    field(
        "through",
        Kind::Quantity(Quantity::Conductivity),
        "thermal conductivity through the thickness of a plate, where it differs from that in its plane",
        "\"5 W/(m·K)\"",
    )
    .within(1e-3, 1e5)
    .default("as conductivity"),
    field(
        "youngs_modulus",
        Kind::Quantity(Quantity::Pressure),
        "Young's modulus",
        "\"69 GPa\"",
    )
    .within(1e5, 2e12),
    field("poisson", Kind::Number, "Poisson's ratio", "0.33")
        .within(0.0, 0.499)
        .default("0.33"),
    field(
        "hardness",
        Kind::Spread(Measure::Quantity(Quantity::Pressure)),
        "Meyer hardness: mean pressure over the projected area of an indentation",
        "\"1200 MPa\"",
    )
    .within(1e5, 2e11),
    field(
        "microhardness",
        Kind::Table(&MICROHARDNESS),
        "Vickers microhardness Hv = c1 (d / 1 µm)^c2, which overrides hardness",
        "{ c1 = \"6.3 GPa\", c2 = -0.26 }",
    ),
    field(
        "expansion",
        Kind::Quantity(Quantity::Expansion),
        "linear thermal expansion",
        "\"23.6 µm/(m·K)\"",
    )
    .within(-1e-4, 1e-2),
    field(
        "yield",
        Kind::Quantity(Quantity::Pressure),
        "0.2 % yield strength",
        "\"276 MPa\"",
    )
    .within(1e4, 2e10),
    field(
        "density",
        Kind::Quantity(Quantity::Density),
        "density",
        "\"2700 kg/m³\"",
    )
    .within(1.0, 3e4),
    field(
        "bearing_limit",
        Kind::Quantity(Quantity::Pressure),
        "permissible pressure under a bolt head",
        "\"410 MPa\"",
    )
    .within(1e4, 2e10),
    field(
        "valid_from",
        Kind::Quantity(Quantity::Temperature),
        "lowest temperature at which your conductivity and expansion hold; for the cold",
        "\"77 K\"",
    )
    .within(0.01, 293.0),
    field("note", Kind::Text, "remark", "\"certificate 1234\""),
];

/// `microhardness` of a material.
pub static MICROHARDNESS: Section = Section {
    name: "microhardness",
    meaning: "Vickers microhardness Hv = c1 (d / 1 µm)^c2",
    shorthand: None,
    fields: &[
        field(
            "c1",
            Kind::Spread(Measure::Quantity(Quantity::Pressure)),
            "hardness at an indentation of 1 µm",
            "\"6.3 GPa\"",
        )
        .within(1e6, 2e11)
        .required(),
        field("c2", Kind::Number, "exponent of the size", "-0.26")
            .within(-1.0, 0.5)
            .required(),
    ],
};
