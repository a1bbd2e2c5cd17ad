//! The faces of every interface at one temperature and one realisation, ready for the laws.

use crate::{
    catalog::{Datum, Material},
    conductance::{Face, Hardness, Interface, Layer, gas},
    estimate::{Failure, Realisation, chain::Warmth},
    joint::{Facing, Joint, Measured, MeasuredKind, Medium, Plate},
    numerics::distribution::{Shape, deviations},
};

/// Hardness over its catalogue value when the catalogue knows no range.
///
/// Machining hardens a face and small indents meet more resistance than the bulk: 1.0 to 1.6 of
/// the bulk value (judgement); the lower end leaves room for the measurement itself.
const HARDNESS_OVER_BULK: [f64; 2] = [0.9, 1.6];
/// Micro-hardness over the value of its correlation (judgement, ±20 %).
const MICROHARDNESS_FACTOR: [f64; 2] = [0.8, 1.2];
/// Conductivity over its catalogue value when the catalogue knows no range (judgement, ±5 %).
const CONDUCTIVITY_FACTOR: [f64; 2] = [0.95, 1.05];
/// Scatter of the gas parameter through the accommodation, one standard deviation (judgement).
const GAS_FACTOR: f64 = 1.2;

/// Conductivity of a plate at a temperature and a realisation, W/(m K); in its plane where that
/// through it differs.
pub fn conductivity(plate: &Plate, temperature: f64, place: f64) -> Result<f64, Failure> {
    let datum = &plate.material.conductivity;
    let value = plate
        .material
        .conductivity_at(temperature)
        .map_err(|fault| Failure::Cold(fault.to_string()))?;
    Ok(value * factor_at(datum, CONDUCTIVITY_FACTOR, place))
}

/// Conductivity of every plate at its temperature, W/(m K).
pub fn conductivities(
    joint: &Joint,
    warmth: &Warmth,
    at: &Realisation,
) -> Result<Vec<f64>, Failure> {
    let plates = joint.plates.iter().enumerate();
    plates
        .map(|(index, plate)| {
            let place = at.conductivity_of(joint, index);
            conductivity(plate, warmth.plate(index), place)
        })
        .collect()
}

/// Everything the laws need of an interface (0 is the warmest), at a temperature in K.
///
/// Roughness and slope of the warm faces lie at one place of their ranges in all interfaces, and so
/// do those of the cold faces: the same shop makes them. Law, hardness, filler and gas move alike.
pub fn interface(
    joint: &Joint,
    (index, temperature): (usize, f64),
    at: &Realisation,
) -> Result<Interface, Failure> {
    let filler = joint.filler(index);
    let measured = joint.measured.as_ref();
    Ok(Interface {
        faces: [
            face(joint, (index, Facing::Cold, temperature), at)?,
            face(joint, (index, Facing::Warm, temperature), at)?,
        ],
        law: joint.contact.law,
        gas: match &joint.service.medium {
            Medium::Vacuum => None,
            Medium::Gas { gas, pressure } => Some(gas::at(
                gas,
                *pressure,
                temperature,
                GAS_FACTOR.powf(deviations(at.gas)),
            )),
        },
        temperature,
        filler: joint.filler_at(index, &at.stated),
        measured: local_points(measured),
        solid_factor: measured
            .map_or(joint.contact.law_factor, |measured| measured.factor)
            .powf(deviations(at.law)),
        filler_factor: filler.map_or(1.0, |filler| filler.factor.powf(deviations(at.filler))),
        filler_modulus: None,
    })
}

fn face(
    joint: &Joint,
    (interface, facing, temperature): (usize, Facing, f64),
    at: &Realisation,
) -> Result<Face, Failure> {
    // The warm face of an interface looks towards the cold side.
    let side = match facing {
        Facing::Cold => 0,
        Facing::Warm => 1,
    };
    let index = interface + side;
    let plate = &joint.plates[index];
    let finish = plate.face(facing);
    Ok(Face {
        // Below a spot a solid of two conductivities spreads heat as one of √(k_in k_through) does.
        conductivity: conductivity(plate, temperature, at.conductivity_of(joint, index))?
            * plate.material.through_ratio().sqrt(),
        roughness: finish.roughness.at(at.roughness[side]),
        slope: finish.slope_at(at.slope[side]),
        youngs_modulus: plate.material.youngs_modulus.value,
        poisson: plate.material.poisson.value,
        hardness: hardness((joint, interface), plate, at.hardness)?,
        emissivity: joint.emissivity_at((interface, side), &at.stated),
        coating: finish.coating.as_ref().map(|coating| Layer {
            thickness: coating.thickness,
            conductivity: coating.plating.conductivity.value,
            hardness: coating.plating.hardness.as_ref().map(|datum| datum.value),
            metal: coating.plating.metal,
        }),
    })
}

fn hardness(
    (joint, interface): (&Joint, usize),
    plate: &Plate,
    place: f64,
) -> Result<Hardness, Failure> {
    let Material {
        microhardness,
        microhardness_spread,
        hardness,
        ..
    } = &plate.material;
    match (microhardness, hardness) {
        (Some([c1, c2]), _) => Ok(Hardness::Micro {
            c1: c1
                * microhardness_spread.as_ref().map_or_else(
                    || between(MICROHARDNESS_FACTOR, place),
                    |datum| factor_at(datum, MICROHARDNESS_FACTOR, place),
                ),
            c2: *c2,
        }),
        (None, Some(datum)) => Ok(Hardness::Meyer(
            datum.value * factor_at(datum, HARDNESS_OVER_BULK, place),
        )),
        // Where the spots carry nothing the hardness is not asked for.
        (None, None) if !joint.is_bare(interface) => Ok(Hardness::Meyer(1e9)),
        (None, None) => Err(Failure::NoHardness(plate.name.clone())),
    }
}

/// Measured h(p) points; a force law enters elsewhere.
fn local_points(measured: Option<&Measured>) -> Option<Vec<(f64, f64)>> {
    match measured.map(|measured| &measured.kind) {
        Some(MeasuredKind::Local { points }) => Some(points.clone()),
        Some(MeasuredKind::ForceLaw { .. }) | None => None,
    }
}

/// Value over nominal at a place between the bounds of a datum, or between default factors.
fn factor_at(datum: &Datum, otherwise: [f64; 2], place: f64) -> f64 {
    match datum.range {
        Some([low, high]) if low < high => {
            let ends = [low / datum.value, 1.0, high / datum.value];
            datum.shape.at(ends, place)
        }
        _ => between(otherwise, place),
    }
}

/// Factor at a place: the low end at −1, 1 at 0, the high end at +1.
fn between([low, high]: [f64; 2], place: f64) -> f64 {
    Shape::Uniform.at([low, 1.0, high], place)
}
