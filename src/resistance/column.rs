//! Columns through both plates: axial flux linear in each, and what they add to a plan network.

/// Areas that the pairs of nodes of a plan network stand for, m².
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Columns {
    /// Area of each plate at each pair of nodes.
    pub plate_area: [Vec<f64>; 2],
    /// Heated area at each pair.
    pub source_area: Vec<f64>,
    /// First patch of each pair, and one past the last patch at the end.
    pub first_patch: Vec<usize>,
    /// Area of each patch of the faying faces.
    pub patch_area: Vec<f64>,
}

/// How heat enters the first plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Inlet {
    /// Uniform flux on the heated area, W/m².
    Flux(f64),
    /// The heated area one kelvin above the coolant.
    Temperature,
    /// The rim of the first plate one kelvin above the coolant.
    Rim,
}

/// How heat leaves the second plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Outlet {
    /// A film on the whole back, W/(m² K); infinite for an isothermal back.
    Film(f64),
    /// Uniform flux on the whole back, W/m².
    Flux(f64),
    /// The rim of the second plate at the coolant's temperature.
    Rim,
}

/// What the rings are made of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plates {
    /// Thickness, m.
    pub thickness: [f64; 2],
    /// Conductivity, W/(m K).
    pub conductivity: [f64; 2],
    /// How heat enters.
    pub inlet: Inlet,
    /// How heat leaves.
    pub outlet: Outlet,
}

/// Temperatures above the coolant and heat through one ring network.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Flow {
    /// Heat through the network, W.
    pub heat: f64,
    /// Temperature of the heated area times that area, K m².
    pub source: f64,
    /// Highest temperature of the outer face of the first plate, K.
    pub hottest: f64,
    /// Mean temperature times area of each plate, K m².
    pub plate: [f64; 2],
    /// Drop across the interface times the area of the faying faces, K m².
    pub interface: f64,
    /// Temperature of the outer face of the second plate times its area, K m².
    pub back: f64,
}

/// One column of a ring with axial flux linear through each plate, all per area.
///
/// ```text
/// q_i (1/h + z1/3 + z2/3) + q_t z1/6 + q_b z2/6 = T1 − T2
/// q_t z1/3 + q_i z1/6                           = T_source − T1      where the source is isothermal
/// q_b z2/3 + q_i z2/6 + q_b/h_s                 = T2 − T_coolant     under a film
/// ```
///
/// z = t/k. With `q_t` and `q_b` eliminated the flux through the interface is
/// `q_i = U (α T1 − β T2 − (α − 1) T_source − fixed)`, `U = 1/(1/h + base)`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Column {
    /// Area resistance beside 1/h, m² K/W.
    base: f64,
    /// α: 1, or 3/2 under an isothermal source.
    upper: f64,
    /// β: 1, or 1 + z2 Y/6 over a film.
    lower: f64,
    /// Temperature difference that a given flux on the back uses up, K.
    fixed: f64,
}

/// What is the same in every column.
pub(super) struct Constants {
    depth: [f64; 2],
    /// Conductivity times thickness of both plates, W/K.
    pub(super) sheet: [f64; 2],
    /// From the mean of the second plate to the coolant, W/(m² K).
    back: f64,
    /// Given on the back, W/m².
    back_flux: f64,
    /// Column without heat given on its outer face.
    plain: Column,
    /// Column under an isothermal source.
    heated: Column,
    inlet: Inlet,
}

/// Columns of one place and the heat that crosses them, before temperatures are known.
#[derive(Clone, Copy, Default)]
pub(super) struct Coupling {
    /// Σ A/(1/h + base) of the plain and of the isothermally heated columns, W/K.
    conductance: [f64; 2],
    /// Flux given on the outer face, W/m².
    flux: f64,
    /// Outer face held at the source temperature, m².
    held: f64,
    /// Faying area, m².
    touching: f64,
}

impl Plates {
    pub(super) fn constants(&self) -> Constants {
        let [z1, z2] = [0, 1].map(|k| self.thickness[k] / self.conductivity[k]);
        let (back, back_flux) = match self.outlet {
            Outlet::Film(film) => ((z2 / 3.0 + film.recip()).recip(), 0.0),
            Outlet::Flux(flux) => (0.0, flux),
            Outlet::Rim => (0.0, 0.0),
        };
        let plain = Column {
            base: (z1 + z2) / 3.0 - z2 * z2 * back / 36.0,
            upper: 1.0,
            lower: 1.0 + z2 * back / 6.0,
            fixed: back_flux * z2 / 6.0,
        };
        Constants {
            depth: [z1, z2],
            sheet: [0, 1].map(|k| self.thickness[k] * self.conductivity[k]),
            back,
            back_flux,
            plain,
            heated: Column {
                base: plain.base - z1 / 12.0,
                upper: 1.5,
                ..plain
            },
            inlet: self.inlet,
        }
    }
}

impl Constants {
    /// The two kinds of column with what given fluxes and the source use up of T1 − T2, K.
    fn columns(&self, coupling: &Coupling) -> [(Column, f64, f64); 2] {
        let [plain, heated] = coupling.conductance;
        [
            (
                self.plain,
                plain,
                self.plain.fixed + coupling.flux * self.depth[0] / 6.0,
            ),
            (self.heated, heated, self.heated.fixed + 0.5),
        ]
    }
}

impl Coupling {
    /// What joins the plates here, W/K.
    pub(super) fn total(&self) -> f64 {
        self.conductance[0] + self.conductance[1]
    }
}

impl Columns {
    pub(super) fn count(&self) -> usize {
        self.source_area.len()
    }

    /// The columns of one place; heat given on part of it is smeared over it, a temperature
    /// given on part of it acts on the same share of the faying area.
    pub(super) fn couple(
        &self,
        node: usize,
        constants: &Constants,
        conductance: &[f64],
    ) -> Coupling {
        let (source, area) = (self.source_area[node], self.plate_area[0][node]);
        let share = if area > 0.0 {
            (source / area).min(1.0)
        } else {
            0.0
        };
        let patches = self.first_patch[node]..self.first_patch[node + 1];
        let areas = &self.patch_area[patches.clone()];
        let through = |base: f64| -> f64 {
            areas
                .iter()
                .zip(&conductance[patches.clone()])
                .map(|(area, h)| area / (h.recip() + base))
                .sum()
        };
        let mut coupling = Coupling {
            touching: areas.iter().sum(),
            ..Coupling::default()
        };
        let mut plain = 1.0;
        match constants.inlet {
            Inlet::Flux(flux) => coupling.flux = flux * share,
            Inlet::Temperature if share > 0.0 => {
                coupling.held = source;
                coupling.conductance[1] = share * through(constants.heated.base);
                plain = 1.0 - share;
            }
            Inlet::Temperature | Inlet::Rim => {}
        }
        if plain > 0.0 {
            coupling.conductance[0] = plain * through(constants.plain.base);
        }
        coupling
    }

    /// Puts the columns of one place into its block and its right-hand side.
    pub(super) fn fill(
        &self,
        node: usize,
        constants: &Constants,
        coupling: &Coupling,
        (block, load): (&mut [f64; 3], &mut [f64; 2]),
    ) {
        let [first, second] = [0, 1].map(|plate| self.plate_area[plate][node]);
        let held = 3.0 / constants.depth[0] * coupling.held;
        block[0] += held;
        block[2] += constants.back * second;
        load[0] += held + coupling.flux * first;
        load[1] -= constants.back_flux * second;
        for (column, through, given) in constants.columns(coupling) {
            block[0] += through * column.upper * column.upper;
            block[1] -= through * column.upper * column.lower;
            block[2] += through * column.lower * column.lower;
            load[0] += column.upper * through * given;
            load[1] -= column.lower * through * given;
        }
    }

    /// Adds what one place tells to the sums.
    pub(super) fn read(
        &self,
        node: usize,
        constants: &Constants,
        (coupling, [t1, t2]): (&Coupling, [f64; 2]),
        flow: &mut Flow,
    ) {
        let [z1, z2] = constants.depth;
        let [first, second] = [0, 1].map(|plate| self.plate_area[plate][node]);
        let [plain, heated] = constants.columns(coupling).map(|(column, through, given)| {
            through * (column.upper * t1 - column.lower * t2 - given)
        });
        let crossing = plain + heated;
        let held_share = if first > 0.0 {
            coupling.held / first
        } else {
            0.0
        };
        // Fluxes times area on the outer faces, over a part of it.
        let entering = |area: f64| {
            coupling.flux * area + 3.0 / z1 * held_share * area * (1.0 - t1) - 0.5 * heated
        };
        let leaving = |area: f64| {
            constants.back_flux * area + constants.back * (t2 * area - crossing * z2 / 6.0)
        };
        flow.plate[0] += t1 * first;
        flow.plate[1] += t2 * second;
        flow.back += t2 * second - z2 * (leaving(second) / 3.0 + crossing / 6.0);
        flow.heat += match constants.inlet {
            Inlet::Rim => crossing,
            Inlet::Flux(_) | Inlet::Temperature => entering(first),
        };
        flow.interface += (t1 - t2) * coupling.touching
            - crossing * (z1 + z2) / 3.0
            - (entering(coupling.touching) * z1 + leaving(coupling.touching) * z2) / 6.0;
        if first > 0.0 {
            let face = t1 + z1 * (entering(first) / 3.0 + crossing / 6.0) / first;
            let face = if coupling.held > 0.0 { 1.0 } else { face };
            flow.source += face * self.source_area[node];
            flow.hottest = flow.hottest.max(face);
        }
    }
}
