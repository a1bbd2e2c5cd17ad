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
/// Checked: `accommodation_relation_is_near_the_measured_one` in `validation_conductance/gap.rs`.
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

#[cfg(test)]
mod tests {
    use super::*;

    const HELIUM: f64 = 4.0026;
    const AIR: f64 = 28.965;

    fn aluminium(temperature: f64) -> Wall {
        Wall {
            temperature,
            molar_mass: 26.98,
        }
    }

    // At 273 K the second term is nothing: M*/(6.8 + M*), by hand 4.0026/10.8026 and 40.551/47.351.
    #[test]
    fn cold_walls_hold_the_heavier_gas_better() {
        let helium = accommodation(HELIUM, Molecule::Monatomic, aluminium(273.0));
        assert!((helium - 0.37052).abs() < 1e-5, "{helium}");
        let air = accommodation(AIR, Molecule::Polyatomic, aluminium(273.0));
        assert!((air - 0.85639).abs() < 1e-5, "{air}");
    }

    // Molecules of a very hot wall meet its atoms one by one, 2.4 μ/(1 + μ)²: equal masses give 0.6, and the
    // wall may as well be the lighter as the heavier partner. What is left of e at 273 · 40 K is 2e-10.
    #[test]
    fn very_hot_walls_meet_molecules_as_single_atoms() {
        let hot = |gas: f64, wall: f64| {
            let wall = Wall {
                temperature: 273.0 * 40.0,
                molar_mass: wall,
            };
            accommodation(gas, Molecule::Monatomic, wall)
        };
        assert!((hot(40.0, 40.0) - 0.6).abs() < 1e-9);
        assert!((hot(4.0, 108.0) - hot(108.0, 4.0)).abs() < 1e-9);
        assert!((hot(4.0, 36.0) - 2.4 * 0.09).abs() < 1e-9);
    }

    // Song & Yovanovich from memory, aluminium at 600 K, computed for this project: half of the last digit.
    #[test]
    fn hot_aluminium_holds_air_and_helium_less() {
        let air = accommodation(AIR, Molecule::Polyatomic, aluminium(600.0));
        assert!((air - 0.73).abs() < 5e-3, "{air}");
        let helium = accommodation(HELIUM, Molecule::Monatomic, aluminium(600.0));
        assert!((helium - 0.32).abs() < 5e-3, "{helium}");
    }
}
