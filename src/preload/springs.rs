//! Disc (Belleville) springs under a head or nut: force against deflection, and stacks of them.

use std::f64::consts::PI;

use crate::{joint::DiscSprings, numerics::roots};

/// A disc spring without contact flats.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Disc {
    /// Outer diameter `D_e`, m.
    pub outer_diameter: f64,
    /// Inner diameter `D_i`, m.
    pub inner_diameter: f64,
    /// Thickness t, m.
    pub thickness: f64,
    /// Height of the free cone `h₀`, m; below √2 t, beyond which the force would fall again.
    pub cone_height: f64,
    /// Young's modulus, Pa.
    pub youngs_modulus: f64,
    /// Poisson's ratio, 1.
    pub poisson: f64,
}

impl Disc {
    /// Force at a deflection, N.
    ///
    /// ```text
    /// F = 4E/(1−ν²) · t⁴/(K₁ D_e²) · s/t [ (h₀/t − s/t)(h₀/t − s/(2t)) + 1 ]
    /// K₁ = 1/π · ((δ−1)/δ)² / ( (δ+1)/(δ−1) − 2/ln δ ),   δ = D_e/D_i
    /// ```
    ///
    /// | symbol | quantity | SI unit | field |
    /// |---|---|---|---|
    /// | `s` | deflection, 0 to `h₀` | m | `deflection` |
    /// | `t`, `h₀` | thickness, height of the free cone | m | `thickness`, `cone_height` |
    /// | `D_e`, `D_i` | outer and inner diameter | m | `outer_diameter`, `inner_diameter` |
    /// | `E`, `ν` | Young's modulus, Poisson's ratio | Pa, 1 | `youngs_modulus`, `poisson` |
    ///
    /// Valid: rectangular section without contact flats (t below about 6 mm), elastic, no friction
    /// (2 to 3 % for a single disc, from memory). One factor stands for cone and bending, which reads the
    /// bending 0.7 % low at δ 2 and 3 % at δ 4.
    /// Source: Almen & Laszlo 1936 as in DIN EN 16984, from memory.
    /// Checked: `series_a_of_din_2093`, `an_integral_of_the_hoop_strain_gives_the_same_force`.
    pub fn force(&self, deflection: f64) -> f64 {
        let (s, h) = (
            deflection / self.thickness,
            self.cone_height / self.thickness,
        );
        self.scale() * s * ((h - s) * (h - s / 2.0) + 1.0)
    }

    /// Stiffness at a deflection, N/m: `dF/ds = scale/t [ (h₀/t)² − 3 (h₀/t)(s/t) + 3/2 (s/t)² + 1 ]`.
    ///
    /// Checked: `stiffness_is_the_slope_of_the_force`.
    pub fn stiffness(&self, deflection: f64) -> f64 {
        let (s, h) = (
            deflection / self.thickness,
            self.cone_height / self.thickness,
        );
        self.scale() / self.thickness * (h * h - 3.0 * h * s + 1.5 * s * s + 1.0)
    }

    /// Force that presses the disc flat, N.
    ///
    /// Checked: `force_at_flat_is_that_of_a_plate`.
    pub fn flat_force(&self) -> f64 {
        self.force(self.cone_height)
    }

    /// `4E/(1−ν²) · t⁴/(K₁ D_e²)`, N.
    fn scale(&self) -> f64 {
        let ratio = self.outer_diameter / self.inner_diameter;
        let slender = (ratio - 1.0) / ratio;
        let shape = slender * slender / ((ratio + 1.0) / (ratio - 1.0) - 2.0 / ratio.ln()) / PI;
        4.0 * self.youngs_modulus / (1.0 - self.poisson.powi(2)) * self.thickness.powi(4)
            / (shape * self.outer_diameter.powi(2))
    }
}

/// Like disc springs in sets of several nested ones, the sets head to head.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SpringStack {
    /// Each disc.
    pub disc: Disc,
    /// Discs nested in one set: their forces add.
    pub parallel: u32,
    /// Sets head to head: their deflections add.
    pub series: u32,
}

impl From<&DiscSprings> for SpringStack {
    fn from(springs: &DiscSprings) -> Self {
        Self {
            disc: Disc {
                outer_diameter: springs.outer_diameter,
                inner_diameter: springs.inner_diameter,
                thickness: springs.thickness,
                cone_height: springs.cone_height,
                youngs_modulus: springs.youngs_modulus,
                poisson: springs.poisson,
            },
            parallel: springs.parallel,
            series: springs.series,
        }
    }
}

impl SpringStack {
    /// Force that presses the whole stack flat, N.
    pub fn flat_force(&self) -> f64 {
        f64::from(self.parallel) * self.disc.flat_force()
    }

    /// Deflection under a force, m; not above that of the flat stack, below no force negative.
    ///
    /// ```text
    /// s = m s_1(F/n)     n discs nested, m sets head to head, s_1 the deflection of one disc
    /// ```
    ///
    /// Valid: discs alike, loaded along their axis.
    /// Source: forces of nested discs and deflections of sets add; friction between nested discs
    /// (2 to 3 % for each, from memory) is left out.
    /// Checked: `nested_discs_add_force_and_sets_add_travel`.
    pub fn deflection(&self, force: f64) -> f64 {
        let each = force / f64::from(self.parallel);
        let height = self.disc.cone_height;
        let sets = f64::from(self.series);
        if each >= self.disc.flat_force() {
            return sets * height;
        }
        if each <= 0.0 {
            return sets * each / self.disc.stiffness(0.0);
        }
        // The force rises over the whole travel, since the cone is lower than √2 t.
        let off = |deflection: f64| self.disc.force(deflection) - each;
        let travel = roots::bracketed(off, 0.0, height, 1e-12 * height);
        sets * travel.unwrap_or(height)
    }

    /// Compliance at a force, m/N; nothing once the stack is flat.
    pub fn compliance(&self, force: f64) -> f64 {
        if force >= self.flat_force() {
            return 0.0;
        }
        let each = self.deflection(force) / f64::from(self.series);
        f64::from(self.series) / (f64::from(self.parallel) * self.disc.stiffness(each))
    }

    /// Length of the free stack, m.
    pub fn free_length(&self) -> f64 {
        f64::from(self.series)
            * (self.disc.cone_height + f64::from(self.parallel) * self.disc.thickness)
    }
}

#[cfg(test)]
mod tests;
