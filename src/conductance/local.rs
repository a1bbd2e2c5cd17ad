//! An interface ready for any pressure.

use crate::{
    conductance::{
        Interface,
        filler::Filling,
        film,
        gas::{self, GapLaw},
        radiation,
        spots::Spots,
    },
    diagnostic::Caution,
    joint::FillerKind,
    numerics::interpolation,
};

mod cautions;

/// What crosses an interface at one pressure, each in W/(m² K).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conductance {
    /// Solid spots, or the measured value.
    pub solid: f64,
    /// Gas in the gaps.
    pub gas: f64,
    /// Radiation across the gaps.
    pub radiation: f64,
    /// Filler, fluid or layer.
    pub filler: f64,
    /// Coatings of both faces, in series with all of these; infinite without any.
    pub series: f64,
    /// All together.
    pub total: f64,
}

/// The local law of one interface: everything that does not depend on pressure is worked out.
///
/// The total is continuous and does not fall with pressure, as long as measured points and tables
/// do not.
#[derive(Clone, Debug)]
pub struct Local {
    interface: Interface,
    spots: Spots,
    /// Gas or fluid beside the spots.
    gap: Option<GapLaw>,
    /// What stands in place of spots and gas.
    filling: Option<Filling>,
    radiation: f64,
    film_resistance: f64,
    unloaded: f64,
    measured: Option<Vec<(f64, f64)>>,
}

impl Local {
    pub(crate) fn of(interface: Interface) -> Self {
        let spots = Spots::of(&interface);
        let roughness = spots.surfaces.roughness;
        let gap = match &interface.filler {
            Some(FillerKind::Fluid { conductivity }) => Some(GapLaw::of_liquid(
                conductivity / interface.filler_factor,
                roughness,
            )),
            _ => interface
                .gas
                .as_ref()
                .map(|gas| GapLaw::new(gas, roughness)),
        };
        let radiation = match interface.filler {
            Some(_) => 0.0,
            None => medium_radiation(&interface),
        };
        let mut local = Self {
            spots,
            gap,
            filling: Filling::of(&interface),
            radiation,
            film_resistance: film::resistance(&interface),
            unloaded: 0.0,
            measured: None,
            interface,
        };
        local.unloaded = local.by_law(0.0);
        if let Some(points) = local.interface.measured.take() {
            local.take_measured(&points);
            local.interface.measured = Some(points);
        }
        local
    }

    /// Local conductance, W/(m² K).
    ///
    /// ```text
    /// h = 1 / (1/(h_s + h_g + h_r) + Σ t/k)        bare or with a fluid
    /// h = 1 / (R_filler + Σ t/k)                   with a paste, pad, foil or table
    /// h = measured h(P), log-log between points
    /// ```
    ///
    /// | symbol | quantity | SI unit |
    /// |---|---|---|
    /// | `P` | contact pressure, below zero as zero | Pa |
    /// | `h_s`, `h_g`, `h_r` | spots, gas or fluid, radiation | W/(m² K) |
    /// | `t/k` | coating of each face | m² K/W |
    ///
    /// At zero pressure what crosses without spots.
    /// Valid, source: as the parts; ranges left are in [`Local::cautions`].
    /// Checked: `load_never_lowers_the_conductance`, `conductance_is_continuous`,
    /// `aluminium_pair_under_each_law` in `tests/validation_conductance.rs`.
    #[inline]
    pub fn total(&self, pressure: f64) -> f64 {
        if pressure <= 0.0 {
            return self.unloaded;
        }
        match &self.measured {
            Some(points) => interpolation::log_log(points, pressure),
            None => self.by_law(pressure),
        }
    }

    /// The interface this was prepared from.
    pub fn interface(&self) -> &Interface {
        &self.interface
    }

    /// Local conductance where the faces touch without pressure, W/(m² K).
    #[inline]
    pub fn unloaded(&self) -> f64 {
        self.unloaded
    }

    /// Local conductance where the faces stand `opening` (m) further apart than where they meet,
    /// W/(m² K).
    ///
    /// The gap is the opening plus the separation at no load. At zero opening it is
    /// [`Local::unloaded`], unless measured values or a pad that loses one face make a step. A paste
    /// fills what its applied thickness fills; the medium crosses the rest.
    pub fn parted(&self, opening: f64) -> f64 {
        let opening = opening.max(0.0);
        let parallel = if let Some(filling) = &self.filling {
            filling.parted(opening, |gap| self.across(gap)).recip()
        } else {
            let separation = opening + self.gap_separation(0.0);
            self.gap.map_or(0.0, |law| law.conductance(separation)) + self.radiation
        };
        self.behind_film(parallel).min(self.unloaded)
    }

    /// What crosses the interface, part by part.
    ///
    /// A measured value under load stands whole as `solid`; it holds the coatings too.
    pub fn at(&self, pressure: f64) -> Conductance {
        let mut parts = Conductance {
            solid: 0.0,
            gas: 0.0,
            radiation: 0.0,
            filler: 0.0,
            series: self.film_resistance.recip(),
            total: self.total(pressure),
        };
        if self.measured.is_some() && pressure > 0.0 {
            parts.solid = parts.total;
            parts.series = f64::INFINITY;
            return parts;
        }
        if let Some(filling) = &self.filling {
            parts.filler = filling.resistance(pressure.max(0.0)).recip();
            return parts;
        }
        parts.solid = self.spots.conductance(pressure);
        parts.radiation = self.radiation;
        let gap = self.gap_conductance(pressure);
        match self.interface.filler {
            Some(_) => parts.filler = gap,
            None => parts.gas = gap,
        }
        parts
    }

    /// Separation of the faces, m: of their mean planes, or the thickness of the filler.
    pub fn separation(&self, pressure: f64) -> f64 {
        match &self.filling {
            Some(filling) => filling.thickness(pressure),
            None => self.gap_separation(pressure),
        }
    }

    /// What to say of this interface when the pressure reaches `peak_pressure` (Pa).
    pub fn cautions(&self, peak_pressure: f64) -> Vec<Caution> {
        cautions::of(self, peak_pressure)
    }

    #[inline]
    fn by_law(&self, pressure: f64) -> f64 {
        let parallel = match &self.filling {
            Some(filling) => filling.resistance(pressure).recip(),
            None => {
                self.spots.conductance(pressure) + self.gap_conductance(pressure) + self.radiation
            }
        };
        self.behind_film(parallel)
    }

    #[inline]
    fn behind_film(&self, parallel: f64) -> f64 {
        if self.film_resistance > 0.0 {
            (parallel.recip() + self.film_resistance).recip()
        } else {
            parallel
        }
    }

    #[inline]
    fn gap_conductance(&self, pressure: f64) -> f64 {
        match &self.gap {
            Some(law) => law.conductance(self.gap_separation(pressure)),
            None => 0.0,
        }
    }

    /// By the plastic load whatever the law of the spots: the gap laws were published with it.
    #[inline]
    fn gap_separation(&self, pressure: f64) -> f64 {
        self.spots.surfaces.roughness * gas::separation_ratio(self.spots.load(pressure))
    }

    /// The medium across an opening beside a pad, W/(m² K).
    fn across(&self, opening: f64) -> f64 {
        let gas = self
            .interface
            .gas
            .map_or(0.0, |gas| gas.conductivity / (opening + gas.parameter));
        gas + medium_radiation(&self.interface)
    }

    /// Measured points, each times the scatter factor, after the point that stands for no load.
    ///
    /// Below the first point the conductance goes straight to what crosses without load: measured
    /// values say nothing of faces that hardly touch, and a held end would lend them its value.
    fn take_measured(&mut self, points: &[(f64, f64)]) {
        let factor = self.interface.solid_factor;
        let mut scaled: Vec<(f64, f64)> = points.iter().map(|&(p, h)| (p, h * factor)).collect();
        if let Some(&(first, conductance)) = scaled.first() {
            self.unloaded = self.unloaded.min(conductance);
            if first > 0.0 {
                scaled.insert(0, (0.0, self.unloaded));
            } else {
                self.unloaded = conductance;
            }
            self.measured = Some(scaled);
        }
    }
}

fn medium_radiation(interface: &Interface) -> f64 {
    let emissivity = interface.faces.each_ref().map(|face| face.emissivity);
    radiation::conductance(interface.temperature, emissivity)
}

#[cfg(test)]
mod tests;
