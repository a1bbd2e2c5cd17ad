//! Fields of a sandwich panel.

use crate::{
    joint::{
        fields::{Field, Kind, Section, field},
        sections::MATERIAL_INLINE,
    },
    units::Quantity,
};

const fn quantity(
    key: &'static str,
    quantity: Quantity,
    meaning: &'static str,
    example: &'static str,
) -> Field {
    field(key, Kind::Quantity(quantity), meaning, example)
}

/// `sandwich` of a plate.
pub static SANDWICH: Section = Section {
    name: "sandwich",
    meaning: "two face sheets on a core: honeycomb or foam; `thickness` is that of the whole panel",
    shorthand: None,
    fields: &[
        quantity(
            "face_sheet",
            Quantity::Length,
            "thickness of either face sheet, which is of the plate's material",
            "\"0.5 mm\"",
        )
        .within(1e-5, 1.0)
        .required(),
        quantity(
            "core_conductivity",
            Quantity::Conductivity,
            "conductivity of the core through the thickness, cell walls and voids together",
            "\"1.2 W/(m·K)\"",
        )
        .within(1e-3, 1e3)
        .required(),
        quantity(
            "core_modulus",
            Quantity::Pressure,
            "Young's modulus of the core through the thickness",
            "\"500 MPa\"",
        )
        .within(1e5, 1e12)
        .default("500 MPa, aluminium honeycomb of about 50 kg/m³"),
        field(
            "insert",
            Kind::Table(&MATERIAL_INLINE),
            "material of the inserts by name, or a table as in [[material]]; it fills the panel below the flange",
            "\"Al 6061-T6\"",
        )
        .default("Al 6061-T6"),
    ],
};
