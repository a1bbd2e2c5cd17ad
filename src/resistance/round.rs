//! Steady heat through two round plates about one bolt, solved in radius and height.
//!
//! Plates are condensed to the face where they meet, once; another torque or another medium between
//! the faces then takes a small system. `cells` do the same with rings, for any number of bolts.

use crate::resistance::failure::Failure;

mod bounds;
mod field;
mod join;
mod mesh;
mod outcome;
mod plate;

pub use field::{Law, heat_under};
pub use outcome::{Health, Heat, Meridian, Place, Profile, Profiles};

use join::{Join, Meeting};
use mesh::{Density, Mesh};
use plate::{Given, Held, Plate};

/// One annular plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Disc {
    /// Radius of the hole, m; 0 for none.
    pub hole_radius: f64,
    /// Radius at which the plate ends, m.
    pub rim_radius: f64,
    /// Thickness, m.
    pub thickness: f64,
    /// Conductivity in the plane and through the thickness, W/(m K).
    pub conductivity: [f64; 2],
}

/// Part of an outer face.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Patch {
    /// All of it.
    Face,
    /// Between two radii, m; what reaches beyond the plate is cut off.
    Annulus([f64; 2]),
}

/// How heat enters the first plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Inlet {
    /// Uniform flux on a part of the outer face.
    Flux(Patch),
    /// A part of the outer face at one temperature.
    Isothermal(Patch),
    /// The rim at one temperature.
    Rim,
}

/// How heat leaves the second plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Outlet {
    /// The whole back at one temperature.
    IsothermalBack,
    /// A film on the whole back, W/(m² K).
    Film(f64),
    /// Uniform flux on a part of the back; for an inlet of given flux alone.
    Flux(Patch),
    /// The rim at one temperature.
    Rim,
}

/// Two coaxial annular plates that meet where both are, and what is given around them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Problem {
    /// The plate that is heated, then the other.
    pub plates: [Disc; 2],
    /// Outer radius of the annulus under each head, m.
    pub bearing_radius: f64,
    /// Radius where contact ends, m: a grid line stands there.
    pub contact_radius: f64,
    /// How heat enters.
    pub inlet: Inlet,
    /// How heat leaves.
    pub outlet: Outlet,
    /// Conductance of the shank between the area means under both heads, W/K; 0 for none.
    pub shank: f64,
}

/// Plates condensed to the face where they meet, ready for any conductance between them.
#[derive(Clone, Debug)]
pub struct Condensed {
    problem: Problem,
    fine: Pair,
    coarse: Pair,
    /// Perfect contact wherever both plates are, and where they press.
    perfect: f64,
    zone: f64,
}

/// Both plates on one grid.
#[derive(Clone, Debug)]
struct Pair {
    shared: Vec<[f64; 2]>,
    plates: [Plate; 2],
}

/// Condenses the plates of a problem.
///
/// ```text
/// ∇·(k ∇T) = 0 in both plates;   −k ∂T/∂n = h(r) (T1 − T2) where they meet;   holes insulated
/// shank: Q_b = G_b (T̄1 − T̄2), means over the annulus under each head
/// ```
///
/// Eight-node ring elements on a grid with lines at holes, rims, bearing, contact and source
/// radii, dense towards the contact edge, where the flux of perfect contact is singular. Each plate
/// is eliminated down to its temperatures where the plates meet. Faces beyond the overlap are
/// insulated.
///
/// Valid: steady, constant conductivity, no heat from faces or rims but where given.
/// Error: what no grid can be laid over, plates that meet nowhere, a flux out of isothermal parts.
/// Source: variational form of conduction; condensation is exact.
/// Checked: `public_cases_are_met`, `uniform_conductance_is_a_composite_wall`,
/// `isothermal_disc_on_a_half_space_is_that_of_holm`.
pub fn condense(problem: &Problem) -> Result<Condensed, Failure> {
    problem.check()?;
    let [fine, coarse] =
        [Density::Fine, Density::Coarse].map(|density| Pair::new(problem, density));
    let mut condensed = Condensed {
        problem: *problem,
        fine: fine?,
        coarse: coarse?,
        perfect: 0.0,
        zone: 0.0,
    };
    condensed.perfect = condensed.between(|_| f64::INFINITY)?;
    condensed.zone = condensed.between(|radius| {
        if radius < problem.contact_radius {
            f64::INFINITY
        } else {
            0.0
        }
    })?;
    Ok(condensed)
}

impl Condensed {
    /// Heat and temperatures for a local conductance of the radius, W/(m² K).
    ///
    /// Zero stands for faces apart in vacuum, infinity for perfect contact; the border of a perfect
    /// zone must be the contact radius. The conductance is read at five points between grid lines.
    /// Infinite resistances where no path leads through.
    pub fn solve(&self, conductance: impl Fn(f64) -> f64) -> Result<Heat, Failure> {
        let fine = self.fields(&self.fine, &conductance)?;
        let coarse = self.fields(&self.coarse, &conductance)?;
        Ok(self.heat(&fine, &coarse, &conductance))
    }

    /// Source to sink with perfect contact wherever both plates are, K/W; 0 where held rims meet.
    ///
    /// The same heat in radius and height, without joint resistance: a lower bound of the joint's.
    pub fn perfect_contact(&self) -> f64 {
        self.perfect
    }

    /// Source to sink with perfect contact inside the contact radius and none beyond, K/W.
    ///
    /// What the convergence of heat costs by itself.
    pub fn perfect_in_zone(&self) -> f64 {
        self.zone
    }

    fn between(&self, conductance: impl Fn(f64) -> f64) -> Result<f64, Failure> {
        let fields = self.fields(&self.fine, &conductance)?;
        Ok(self.fine.source_to_sink(&fields))
    }

    fn fields(&self, pair: &Pair, conductance: impl Fn(f64) -> f64) -> Result<Meeting, Failure> {
        let join = Join::new(&self.problem, pair, conductance);
        join.solve().map_err(|_| unsolved("joining of the plates"))
    }
}

impl Pair {
    fn new(problem: &Problem, density: Density) -> Result<Self, Failure> {
        let mesh = Mesh::new(problem, density);
        if mesh.overlap.len() < 2 {
            return Err(unsolved("grid of the plates"));
        }
        let plate = |index: usize| {
            Plate::new(
                (&mesh, index),
                &problem.plates[index],
                &problem.given(index),
            )
            .map_err(|_| unsolved("elimination of a plate"))
        };
        Ok(Self {
            shared: mesh.shared().collect(),
            plates: [plate(0)?, plate(1)?],
        })
    }
}

fn unsolved(solver: &'static str) -> Failure {
    Failure::NotSolved {
        solver,
        rounds: 0,
        residual: f64::NAN,
    }
}

impl Patch {
    /// Radii between which it lies on a plate.
    fn radii(self, disc: &Disc) -> [f64; 2] {
        match self {
            Patch::Face => [disc.hole_radius, disc.rim_radius],
            Patch::Annulus([inner, outer]) => {
                [inner.max(disc.hole_radius), outer.min(disc.rim_radius)]
            }
        }
    }
}

impl Outlet {
    fn patch(self) -> Option<Patch> {
        match self {
            Outlet::IsothermalBack => Some(Patch::Face),
            Outlet::Flux(patch) => Some(patch),
            Outlet::Film(_) | Outlet::Rim => None,
        }
    }

    /// Film to the coolant; an endless film is an isothermal back.
    fn film(self) -> Option<f64> {
        match self {
            Outlet::Film(film) if film.is_finite() => Some(film),
            _ => None,
        }
    }
}

impl Problem {
    /// What is given on one plate.
    fn given(&self, plate: usize) -> Given {
        let disc = &self.plates[plate];
        let (held, heat) = if plate == 0 {
            match self.inlet {
                Inlet::Flux(_) => (Held::Nowhere, 1.0),
                Inlet::Isothermal(_) => (Held::Patch, 0.0),
                Inlet::Rim => (Held::Rim, 0.0),
            }
        } else {
            match self.outlet {
                Outlet::Film(film) if film.is_finite() => (Held::Nowhere, 0.0),
                Outlet::IsothermalBack | Outlet::Film(_) => (Held::Patch, 0.0),
                Outlet::Flux(_) => (Held::Nowhere, -1.0),
                Outlet::Rim => (Held::Rim, 0.0),
            }
        };
        Given {
            held,
            film: if plate == 1 {
                self.outlet.film().unwrap_or(0.0)
            } else {
                0.0
            },
            heat,
            patch: self.patch(plate).unwrap_or(Patch::Face.radii(disc)),
            head: [disc.hole_radius, self.bearing_radius],
        }
    }

    /// Whether what is given on the outer face of a plate, if anything, is given on all of it.
    fn covers(&self, plate: usize) -> bool {
        let disc = &self.plates[plate];
        self.patch(plate)
            .is_none_or(|[inner, outer]| inner <= disc.hole_radius && disc.rim_radius <= outer)
    }

    /// Refuses what no grid can be laid over or no heat balance closed for.
    fn check(&self) -> Result<(), Failure> {
        let disc = |disc: &Disc| {
            let positive = [disc.thickness, disc.conductivity[0], disc.conductivity[1]];
            0.0 <= disc.hole_radius
                && disc.hole_radius < disc.rim_radius
                && disc.rim_radius.is_finite()
                && disc.hole_radius < self.bearing_radius
                && self.bearing_radius <= disc.rim_radius
                && positive
                    .iter()
                    .all(|value| *value > 0.0 && value.is_finite())
        };
        let patches =
            (0..2).all(|plate| self.patch(plate).is_none_or(|[inner, outer]| inner < outer));
        let film = match self.outlet {
            Outlet::Film(film) => film > 0.0,
            Outlet::Flux(_) => matches!(self.inlet, Inlet::Flux(_)),
            Outlet::IsothermalBack | Outlet::Rim => true,
        };
        let sound = self.plates.iter().all(disc)
            && patches
            && film
            && self.contact_radius > 0.0
            && self.contact_radius.is_finite()
            && self.shank >= 0.0
            && self.shank.is_finite();
        if sound {
            Ok(())
        } else {
            Err(unsolved("grid of the plates"))
        }
    }
}

#[cfg(test)]
mod tests;
