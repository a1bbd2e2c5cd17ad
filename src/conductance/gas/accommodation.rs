//! Thermal accommodation of a gas at a clean metal wall.

/// Whether the molecule carries internal energy.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Molecule {
    /// Single atoms.
    Monatomic,
    /// Anything else.
    Polyatomic,
}

/// A wall as the gas meets it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wall {
    /// Temperature, K.
    pub temperature: f64,
    /// Molar mass of the wall's atoms, in the unit of the gas.
    pub molar_mass: f64,
}

/// Accommodation coefficient by the relation for engineering surfaces, 1.
///
/// ```text
/// α = e M*/(6.8 + M*) + (1 − e) 2.4 μ/(1 + μ)²,   e = exp(−0.57 (T − 273)/273)
/// M* = M_g (monatomic) or 1.4 M_g,   μ = M_g/M_s
/// ```
///
/// | symbol | quantity | unit | argument |
/// |---|---|---|---|
/// | `M_g` | molar mass of the gas | g/mol | `gas_mass` |
/// | `M_s` | molar mass of the wall | g/mol | `wall.molar_mass` |
/// | `T` | temperature of the wall | K | `wall.temperature` |
///
/// The one place with g/mol: the constant 6.8 carries it.
/// Valid: clean engineering metals at 273 K and above.
/// Source: Song & Yovanovich 1987, constants from memory; within 20 % of Trott et al. 2010.
/// Checked: `accommodation_relation_is_near_the_measured_one` in `tests/validation_conductance.rs`.
pub fn accommodation(gas_mass: f64, molecule: Molecule, wall: Wall) -> f64 {
    let weight = (-0.57 * (wall.temperature - 273.0) / 273.0).exp();
    let effective_mass = match molecule {
        Molecule::Monatomic => gas_mass,
        Molecule::Polyatomic => 1.4 * gas_mass,
    };
    let ratio = gas_mass / wall.molar_mass;
    weight * effective_mass / (6.8 + effective_mass)
        + (1.0 - weight) * 2.4 * ratio / (1.0 + ratio).powi(2)
}
