//! The faces of every interface at one temperature and one realisation, ready for the laws.

use serde_json::{Value, json};

use crate::{
    catalog::{Datum, Material},
    conductance::{Face, Hardness, Interface, Layer, gas},
    estimate::{Failure, Realisation},
    joint::{Bounds, Facing, Joint, Measured, MeasuredKind, Medium, Plate},
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

/// Conductivity of a plate with all looked up that no draw moves.
#[derive(Clone, Copy, Debug)]
pub struct Conducting {
    value: f64,
    factor: Factor,
}

impl Conducting {
    /// A plate at a temperature, K.
    pub fn of(plate: &Plate, temperature: f64) -> Result<Self, Failure> {
        Ok(Self {
            value: plate
                .material
                .conductivity_at(temperature)
                .map_err(|fault| Failure::Cold(fault.to_string()))?,
            factor: Factor::of(&plate.material.conductivity, CONDUCTIVITY_FACTOR),
        })
    }

    /// Value and bounds over it, as data.
    pub fn table(&self) -> Value {
        json!({ "value": self.value, "bounds": self.factor.bounds() })
    }

    /// At a place of its range, W/(m K); in its plane where that through the plate differs.
    #[inline]
    pub fn at(&self, place: f64) -> f64 {
        self.value * self.factor.at(place)
    }
}

/// Everything the laws need of an interface, with all looked up that no draw moves.
#[derive(Clone, Debug)]
pub struct Facets {
    index: usize,
    nominal: Interface,
    sides: [Side; 2],
    gas: Option<gas::Rarefied>,
    solid: f64,
    filler: f64,
}

/// A face of an interface and how far it may move.
#[derive(Clone, Copy, Debug)]
struct Side {
    plate: usize,
    conducting: Conducting,
    /// What the conductivity in the plane is multiplied by below a spot.
    below_spots: f64,
    roughness: Bounds,
    slope_factor: f64,
    hardness: Hardness,
    hardness_factor: Factor,
}

impl Facets {
    /// An interface (0 is the warmest) at a temperature in K.
    pub fn of(joint: &Joint, (index, temperature): (usize, f64)) -> Result<Self, Failure> {
        let filler = joint.filler(index);
        let measured = joint.measured.as_ref();
        let sides = [
            side(joint, (index, Facing::Cold, temperature))?,
            side(joint, (index, Facing::Warm, temperature))?,
        ];
        let gas = match &joint.service.medium {
            Medium::Vacuum => None,
            Medium::Gas { gas, pressure } => Some(gas::Rarefied::of(gas, *pressure, temperature)),
        };
        let nominal = Interface {
            faces: [
                face(joint, (index, Facing::Cold), &sides[0]),
                face(joint, (index, Facing::Warm), &sides[1]),
            ],
            law: joint.contact.law,
            gas: gas.map(|gas| gas.with(1.0)),
            temperature,
            filler: filler.map(|filler| filler.kind.clone()),
            measured: local_points(measured),
            solid_factor: 1.0,
            filler_factor: 1.0,
            filler_modulus: None,
        };
        Ok(Self {
            index,
            nominal,
            sides,
            gas,
            solid: measured.map_or(joint.contact.law_factor, |measured| measured.factor),
            filler: filler.map_or(1.0, |filler| filler.factor),
        })
    }

    /// Both faces with what they may be, and the scatter of the law, as data.
    pub fn table(&self) -> Value {
        let sides = self
            .sides
            .iter()
            .zip(&self.nominal.faces)
            .map(|(side, face)| {
                let Bounds {
                    low, nominal, high, ..
                } = side.roughness;
                let hardness = match side.hardness {
                    Hardness::Meyer(value) => json!({ "meyer": value }),
                    Hardness::Micro { c1, c2 } => json!({ "c1": c1, "c2": c2 }),
                };
                json!({
                    "conductivity": side.conducting.table(),
                    "below_spots": side.below_spots,
                    "roughness": [low, nominal, high],
                    "slope": face.slope,
                    "slope_factor": side.slope_factor,
                    "hardness": hardness,
                    "hardness_bounds": side.hardness_factor.bounds(),
                    "youngs_modulus": face.youngs_modulus,
                    "poisson": face.poisson,
                })
            });
        json!({ "sides": sides.collect::<Vec<Value>>(), "law_factor": self.solid })
    }

    /// The same where the pressure on the layer itself is known, with pressure over true strain, Pa.
    #[must_use]
    pub fn pressed(mut self, filler_modulus: Option<f64>) -> Self {
        self.nominal.filler_modulus = filler_modulus;
        self
    }

    /// The interface at a realisation of the joint it belongs to.
    ///
    /// Roughness and slope of the warm faces lie at one place of their ranges in all interfaces, and
    /// so do those of the cold faces: the same shop makes them. Law, hardness, filler and gas move
    /// alike.
    pub fn at(&self, joint: &Joint, at: &Realisation) -> Interface {
        let mut found = self.nominal.clone();
        let finishes = joint.finishes(self.index);
        for (index, (face, side)) in found.faces.iter_mut().zip(&self.sides).enumerate() {
            let place = at.conductivity_of(joint, side.plate);
            face.conductivity = side.conducting.at(place) * side.below_spots;
            face.roughness = side.roughness.at(at.roughness[index]);
            face.slope = finishes[index].slope_at(at.slope[index], face.roughness);
            let factor = side.hardness_factor.at(at.hardness);
            face.hardness = match side.hardness {
                Hardness::Micro { c1, c2 } => Hardness::Micro {
                    c1: c1 * factor,
                    c2,
                },
                Hardness::Meyer(value) => Hardness::Meyer(value * factor),
            };
        }
        let factor = |scatter: f64, place: f64| scatter.powf(deviations(place));
        found.gas = self.gas.map(|gas| gas.with(factor(GAS_FACTOR, at.gas)));
        found.solid_factor = factor(self.solid, at.law);
        found.filler_factor = if self.filler > 1.0 {
            factor(self.filler, at.filler)
        } else {
            1.0
        };
        if !joint.uncertain.is_empty() {
            found.filler = joint.filler_at(self.index, &at.stated);
            for (index, face) in found.faces.iter_mut().enumerate() {
                face.emissivity = joint.emissivity_at((self.index, index), &at.stated);
            }
        }
        found
    }
}

fn side(
    joint: &Joint,
    (interface, facing, temperature): (usize, Facing, f64),
) -> Result<Side, Failure> {
    // The warm face of an interface looks towards the cold side.
    let index = match facing {
        Facing::Cold => interface,
        Facing::Warm => interface + 1,
    };
    let plate = &joint.plates[index];
    let finish = plate.face(facing);
    let (hardness, hardness_factor) = hardness((joint, interface), plate)?;
    Ok(Side {
        plate: index,
        conducting: Conducting::of(plate, temperature)?,
        // Below a spot a solid of two conductivities spreads heat as one of √(k_in k_through) does.
        below_spots: plate.material.through_ratio().sqrt(),
        roughness: finish.roughness,
        slope_factor: finish.slope_factor,
        hardness,
        hardness_factor,
    })
}

/// The face at nominal.
fn face(joint: &Joint, (interface, facing): (usize, Facing), side: &Side) -> Face {
    let plate = &joint.plates[side.plate];
    Face {
        conductivity: side.conducting.at(0.0) * side.below_spots,
        roughness: side.roughness.nominal,
        slope: plate.face(facing).slope,
        youngs_modulus: plate.material.youngs_modulus.value,
        poisson: plate.material.poisson.value,
        hardness: side.hardness,
        emissivity: joint.contact.emissivity[interface][side.plate - interface],
        coating: plate.face(facing).coating.as_ref().map(|coating| Layer {
            thickness: coating.thickness,
            conductivity: coating.plating.conductivity.value,
            hardness: coating.plating.hardness.as_ref().map(|datum| datum.value),
            metal: coating.plating.metal,
        }),
    }
}

/// Hardness of a plate at nominal, and what it may be multiplied by.
fn hardness(
    (joint, interface): (&Joint, usize),
    plate: &Plate,
) -> Result<(Hardness, Factor), Failure> {
    let Material {
        microhardness,
        microhardness_spread,
        hardness,
        ..
    } = &plate.material;
    match (microhardness, hardness) {
        (Some([c1, c2]), _) => Ok((
            Hardness::Micro { c1: *c1, c2: *c2 },
            microhardness_spread
                .as_ref()
                .map_or(Factor::uniform(MICROHARDNESS_FACTOR), |datum| {
                    Factor::of(datum, MICROHARDNESS_FACTOR)
                }),
        )),
        (None, Some(datum)) => Ok((
            Hardness::Meyer(datum.value),
            Factor::of(datum, HARDNESS_OVER_BULK),
        )),
        // Where the spots carry nothing the hardness is not asked for.
        (None, None) if !joint.is_bare(interface) => {
            Ok((Hardness::Meyer(1e9), Factor::uniform([1.0; 2])))
        }
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

/// What a value may be multiplied by.
#[derive(Clone, Copy, Debug)]
struct Factor {
    ends: [f64; 3],
    shape: Shape,
}

impl Factor {
    /// The same weight everywhere on one side of 1.
    const fn uniform([low, high]: [f64; 2]) -> Self {
        Self {
            ends: [low, 1.0, high],
            shape: Shape::Uniform,
        }
    }

    /// Bounds of a datum over its value, or default factors.
    fn of(datum: &Datum, otherwise: [f64; 2]) -> Self {
        match datum.range {
            Some([low, high]) if low < high => Self {
                ends: [low / datum.value, 1.0, high / datum.value],
                shape: datum.shape,
            },
            _ => Self::uniform(otherwise),
        }
    }

    /// At a place of the weight.
    #[inline]
    fn at(&self, place: f64) -> f64 {
        self.shape.at(self.ends, place)
    }

    /// Its ends.
    fn bounds(&self) -> [f64; 2] {
        [self.ends[0], self.ends[2]]
    }
}
