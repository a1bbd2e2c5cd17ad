//! What a unit measures: whole powers of length, mass, time, temperature and angle.

use crate::units::Quantity;

/// Largest power of a base that any unit may reach; beyond it the text is refused.
const LARGEST_POWER: i32 = 12;

/// Powers of metre, kilogram, second, kelvin and radian.
///
/// The radian counts as a base, so that `30 °` is no percentage.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) struct Dimension(pub [i8; 5]);

/// No dimension at all: a plain factor.
pub(super) const NONE: Dimension = Dimension([0, 0, 0, 0, 0]);
/// m.
pub(super) const LENGTH: Dimension = Dimension([1, 0, 0, 0, 0]);
/// kg.
pub(super) const MASS: Dimension = Dimension([0, 1, 0, 0, 0]);
/// s.
pub(super) const TIME: Dimension = Dimension([0, 0, 1, 0, 0]);
/// K.
pub(super) const TEMPERATURE: Dimension = Dimension([0, 0, 0, 1, 0]);
/// rad.
pub(super) const ANGLE: Dimension = Dimension([0, 0, 0, 0, 1]);
/// N = kg m/s².
pub(super) const FORCE: Dimension = Dimension([1, 1, -2, 0, 0]);
/// N m, which is also J.
pub(super) const ENERGY: Dimension = Dimension([2, 1, -2, 0, 0]);
/// Pa = N/m².
pub(super) const PRESSURE: Dimension = Dimension([-1, 1, -2, 0, 0]);
/// W = J/s.
pub(super) const POWER: Dimension = Dimension([2, 1, -3, 0, 0]);
/// m/s², the factor between a mass and its weight.
pub(super) const ACCELERATION: Dimension = Dimension([1, 0, -2, 0, 0]);

/// Dimensions that are no [`Quantity`] but have a name worth saying in a fault.
const OTHERS: [(Dimension, &str); 6] = [
    (MASS, "mass"),
    (TIME, "time"),
    (Dimension([3, 0, 0, 0, 0]), "volume"),
    (Dimension([1, 0, -1, 0, 0]), "speed"),
    (Dimension([-1, -1, 3, 1, 0]), "thermal resistivity"),
    (NONE, "plain factor"),
];

impl Dimension {
    /// The dimension of a quantity.
    pub fn of(quantity: Quantity) -> Self {
        match quantity {
            Quantity::Length => LENGTH,
            Quantity::Force => FORCE,
            Quantity::Torque => ENERGY,
            Quantity::Pressure => PRESSURE,
            Quantity::Temperature | Quantity::TemperatureDifference => TEMPERATURE,
            Quantity::Power => POWER,
            Quantity::Conductivity => Self([1, 1, -3, -1, 0]),
            Quantity::FilmCoefficient => Self([0, 1, -3, -1, 0]),
            Quantity::Resistance => Self([-2, -1, 3, 1, 0]),
            Quantity::Conductance => Self([2, 1, -3, -1, 0]),
            Quantity::AreaResistance => Self([0, -1, 3, 1, 0]),
            Quantity::Expansion => Self([0, 0, 0, -1, 0]),
            Quantity::Ratio => NONE,
            Quantity::Angle => ANGLE,
            Quantity::Density => Self([-3, 1, 0, 0, 0]),
            Quantity::HeatFlux => Self([0, 1, -3, 0, 0]),
            Quantity::Area => Self([2, 0, 0, 0, 0]),
            Quantity::Curvature => Self([-1, 0, 0, 0, 0]),
        }
    }

    /// The dimension of this times `other` to the `power`; none where a power runs away.
    pub fn times(self, other: Self, power: i32) -> Option<Self> {
        let mut product = self.0;
        for (mine, theirs) in product.iter_mut().zip(other.0) {
            let sum = i32::from(*mine) + i32::from(theirs).checked_mul(power)?;
            if sum.abs() > LARGEST_POWER {
                return None;
            }
            *mine = i8::try_from(sum).ok()?;
        }
        Some(Self(product))
    }

    /// The name of what has this dimension, when it has one.
    pub fn name(self) -> Option<&'static str> {
        Quantity::ALL
            .into_iter()
            .find(|&quantity| quantity != Quantity::Ratio && Self::of(quantity) == self)
            .map(Quantity::name)
            .or_else(|| {
                OTHERS
                    .into_iter()
                    .find(|&(dimension, _)| dimension == self)
                    .map(|(_, name)| name)
            })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_torque_is_a_force_times_a_length() {
        assert_eq!(
            FORCE.times(LENGTH, 1),
            Some(Dimension::of(Quantity::Torque))
        );
    }

    #[test]
    fn runaway_powers_are_refused() {
        assert_eq!(NONE.times(LENGTH, LARGEST_POWER + 1), None);
        assert_eq!(NONE.times(ENERGY, i32::MAX), None);
    }

    #[test]
    fn no_two_quantities_share_a_dimension_but_the_temperatures() {
        for (at, &one) in Quantity::ALL.iter().enumerate() {
            for &other in &Quantity::ALL[at + 1..] {
                let temperatures = one == Quantity::Temperature;
                assert_eq!(
                    Dimension::of(one) == Dimension::of(other),
                    temperatures && other == Quantity::TemperatureDifference,
                    "{one:?} {other:?}"
                );
            }
        }
    }
}
