//! Heat through two plates around one bolt: one mean temperature per plate and ring.
//!
//! The flux field behind the network is admissible: radial flux uniform over the thickness, axial
//! flux linear through each plate. By the complementary energy principle the resistance of a
//! round pair of equal discs is an upper bound for the conductance used, up to the rings.

use std::f64::consts::PI;

use crate::numerics::block_tridiagonal::Ladder;

/// Rings of both plates around one bolt, as areas and shape factors; lengths in m.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Rings {
    /// Area of each ring of each plate, m².
    pub plate_area: [Vec<f64>; 2],
    /// Heated area of each ring, m².
    pub source_area: Vec<f64>,
    /// 2π/ln(r_{j+1}/r_j) between ring centres on the equal-area circle; 0 where a ring is empty.
    pub shape: [Vec<f64>; 2],
    /// 2π/ln(R/r) from the last ring centre of each plate to its rim; 0 where it has none.
    pub rim_shape: [f64; 2],
    /// First patch of each ring, and one past the last patch at the end.
    pub first_patch: Vec<usize>,
    /// Area of each patch of the faying faces, m².
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
/// z = t/k. With q_t and q_b eliminated the flux through the interface is
/// q_i = U (α T1 − β T2 − (α − 1) T_source − fixed), U = 1/(1/h + base).
#[derive(Clone, Copy, Debug, PartialEq)]
struct Column {
    /// Area resistance beside 1/h, m² K/W.
    base: f64,
    /// α: 1, or 3/2 under an isothermal source.
    upper: f64,
    /// β: 1, or 1 + z2 Y/6 over a film.
    lower: f64,
    /// Temperature difference that given fluxes on the outer faces use up, K.
    fixed: f64,
}

impl Plates {
    /// z = t/k of both plates, m² K/W.
    fn depth(&self) -> [f64; 2] {
        [0, 1].map(|plate| self.thickness[plate] / self.conductivity[plate])
    }

    /// Y = 1/(z2/3 + 1/h_s), W/(m² K): from the mean of the second plate to the coolant.
    fn back_conductance(&self) -> f64 {
        match self.outlet {
            Outlet::Film(film) => (self.depth()[1] / 3.0 + film.recip()).recip(),
            Outlet::Flux(_) | Outlet::Rim => 0.0,
        }
    }

    /// Flux given on the back, W/m².
    fn back_flux(&self) -> f64 {
        match self.outlet {
            Outlet::Flux(flux) => flux,
            Outlet::Film(_) | Outlet::Rim => 0.0,
        }
    }

    fn column(&self, heated: Heated) -> Column {
        let [z1, z2] = self.depth();
        let back = self.back_conductance();
        let mut column = Column {
            base: (z1 + z2) / 3.0 - z2 * z2 * back / 36.0,
            upper: 1.0,
            lower: 1.0 + z2 * back / 6.0,
            fixed: self.back_flux() * z2 / 6.0,
        };
        match heated {
            Heated::Isothermal => {
                column.base -= z1 / 12.0;
                column.upper = 1.5;
            }
            Heated::Flux(flux) => column.fixed += flux * z1 / 6.0,
        }
        column
    }
}

/// What acts on the outer face above one column.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Heated {
    Isothermal,
    Flux(f64),
}

/// Heated state and weight of the columns that share a ring.
struct Mix {
    columns: [(Column, f64); 2],
    flux: f64,
    isothermal_area: f64,
}

impl Rings {
    fn count(&self) -> usize {
        self.source_area.len()
    }

    /// The columns of one ring: the heated share of an isothermal zone apart, given flux smeared.
    fn mix(&self, ring: usize, plates: &Plates) -> Mix {
        let (heated, area) = (self.source_area[ring], self.plate_area[0][ring]);
        let share = if area > 0.0 {
            (heated / area).min(1.0)
        } else {
            0.0
        };
        let plain = |flux| plates.column(Heated::Flux(flux));
        match plates.inlet {
            Inlet::Flux(flux) => Mix {
                columns: [(plain(flux * share), 1.0), (plain(0.0), 0.0)],
                flux: flux * share,
                isothermal_area: 0.0,
            },
            Inlet::Temperature => Mix {
                columns: [
                    (plates.column(Heated::Isothermal), share),
                    (plain(0.0), 1.0 - share),
                ],
                flux: 0.0,
                isothermal_area: heated,
            },
            Inlet::Rim => Mix {
                columns: [(plain(0.0), 1.0), (plain(0.0), 0.0)],
                flux: 0.0,
                isothermal_area: 0.0,
            },
        }
    }

    /// Σ A/(1/h + base) over the patches of a ring, W/K.
    fn coupling(&self, ring: usize, base: f64, conductance: &[f64]) -> f64 {
        let patches = self.first_patch[ring]..self.first_patch[ring + 1];
        self.patch_area[patches.clone()]
            .iter()
            .zip(&conductance[patches])
            .map(|(area, h)| area / (h.recip() + base))
            .sum()
    }

    /// Temperatures and heat for the conductance of each patch, W/(m² K), 0 and infinity allowed;
    /// none when no path leads from source to sink.
    pub fn flow(&self, plates: &Plates, conductance: &[f64]) -> Option<Flow> {
        let count = self.count();
        let depth = plates.depth();
        let (back, back_flux) = (plates.back_conductance(), plates.back_flux());
        let sheet = [0, 1].map(|plate| plates.thickness[plate] * plates.conductivity[plate]);
        let mut ladder = Ladder::new(count);
        let mut load = vec![[0.0; 2]; count];
        let mut couplings = vec![[0.0; 2]; count];
        for ring in 0..count {
            let area = [self.plate_area[0][ring], self.plate_area[1][ring]];
            if ring + 1 < count {
                for plate in 0..2 {
                    let link = sheet[plate] * self.shape[plate][ring];
                    ladder.link(ring, plate, link);
                }
            }
            let mix = self.mix(ring, plates);
            let top = 3.0 / depth[0] * mix.isothermal_area;
            ladder.rungs[ring][0] += top;
            ladder.rungs[ring][2] += back * area[1];
            load[ring][0] += top + mix.flux * area[0];
            load[ring][1] -= back_flux * area[1];
            for (index, (column, share)) in mix.columns.into_iter().enumerate() {
                if share <= 0.0 {
                    continue;
                }
                let coupling = share * self.coupling(ring, column.base, conductance);
                couplings[ring][index] = coupling;
                let Column { upper, lower, .. } = column;
                let given = coupling * (column.fixed + (upper - 1.0));
                let block = &mut ladder.rungs[ring];
                block[0] += coupling * upper * upper;
                block[1] -= coupling * upper * lower;
                block[2] += coupling * lower * lower;
                load[ring][0] += upper * given;
                load[ring][1] -= lower * given;
            }
            for plate in 0..2 {
                // A plate without area here keeps a node of its own at the coolant's temperature.
                if area[plate] <= 0.0 {
                    ladder.rungs[ring][2 * plate] += 1.0;
                }
            }
        }
        let rim = [0, 1].map(|plate| sheet[plate] * self.rim_shape[plate]);
        let last = [0, 1].map(|plate| self.last(plate));
        if plates.inlet == Inlet::Rim {
            ladder.rungs[last[0]][0] += rim[0];
            load[last[0]][0] += rim[0];
        }
        match plates.outlet {
            Outlet::Rim => ladder.rungs[last[1]][2] += rim[1],
            // Given fluxes leave the level open: the last ring is tied to it, and as what enters
            // also leaves, the tie carries nothing.
            Outlet::Flux(_) => ladder.rungs[last[1]][2] += sheet[1],
            Outlet::Film(_) => {}
        }
        let temperatures = ladder.solution(load)?;
        let mut flow = Flow {
            hottest: f64::NEG_INFINITY,
            ..Flow::default()
        };
        for (ring, [t1, t2]) in temperatures.iter().copied().enumerate() {
            let area = [self.plate_area[0][ring], self.plate_area[1][ring]];
            let mix = self.mix(ring, plates);
            let mut through = [0.0; 2];
            for (index, (column, _)) in mix.columns.iter().enumerate() {
                through[index] = couplings[ring][index]
                    * (column.upper * t1 - column.lower * t2 - (column.upper - 1.0) - column.fixed);
            }
            let crossing = through[0] + through[1];
            let touching: f64 = self.patch_area[self.first_patch[ring]..self.first_patch[ring + 1]]
                .iter()
                .sum();
            flow.plate[0] += t1 * area[0];
            flow.plate[1] += t2 * area[1];
            // q_t and q_b times area, W.
            let isothermal = plates.inlet == Inlet::Temperature;
            let entering = if isothermal {
                3.0 / depth[0] * mix.isothermal_area * (1.0 - t1) - 0.5 * through[0]
            } else {
                mix.flux * area[0]
            };
            let leaving = back_flux * area[1] + back * (t2 * area[1] - crossing * depth[1] / 6.0);
            let face = t1 * area[0] + depth[0] * (entering / 3.0 + crossing / 6.0);
            if area[0] > 0.0 {
                let share = self.source_area[ring] / area[0];
                if isothermal {
                    flow.source += self.source_area[ring];
                    flow.hottest = flow
                        .hottest
                        .max(if share > 0.0 { 1.0 } else { face / area[0] });
                } else {
                    flow.source += face * share;
                    flow.hottest = flow.hottest.max(face / area[0]);
                }
                let under = if isothermal { share * touching } else { 0.0 };
                // Face fluxes over the faying area alone.
                let inlet_flux = if isothermal {
                    3.0 / depth[0] * under * (1.0 - t1) - 0.5 * through[0]
                } else {
                    mix.flux * touching
                };
                let outlet_flux =
                    back_flux * touching + back * (t2 * touching - crossing * depth[1] / 6.0);
                flow.interface += (t1 - t2) * touching
                    - crossing * (depth[0] + depth[1]) / 3.0
                    - inlet_flux * depth[0] / 6.0
                    - outlet_flux * depth[1] / 6.0;
            }
            flow.back += t2 * area[1] - depth[1] * (leaving / 3.0 + crossing / 6.0);
            flow.heat += match plates.inlet {
                Inlet::Rim => crossing,
                Inlet::Flux(_) | Inlet::Temperature => entering,
            };
        }
        Some(flow)
    }

    /// The last ring of a plate that has any area.
    fn last(&self, plate: usize) -> usize {
        self.plate_area[plate]
            .iter()
            .rposition(|area| *area > 0.0)
            .unwrap_or(0)
    }
}

/// Radial shape factors of rings with given areas, mapped to circles of equal area about a hole:
/// 2π/ln(r_{j+1}/r_j) between ring centres, and from the last centre to the rim.
pub fn shapes(hole_radius: f64, areas: &[f64]) -> (Vec<f64>, f64) {
    let mut shape = vec![0.0; areas.len().saturating_sub(1)];
    let mut squared = hole_radius * hole_radius;
    let mut inner = hole_radius;
    let mut last: Option<(usize, f64)> = None;
    for (ring, area) in areas.iter().enumerate() {
        squared += area / PI;
        let outer = squared.sqrt();
        if *area > 0.0 {
            let centre = 0.5 * (inner + outer);
            if let Some((previous, before)) = last
                && previous + 1 == ring
            {
                shape[previous] = 2.0 * PI / (centre / before).ln();
            }
            last = Some((ring, centre));
        }
        inner = outer;
    }
    let rim = last.map_or(0.0, |(_, centre)| 2.0 * PI / (inner / centre).ln());
    (shape, rim)
}

/// Radii that bound the rings of one bolt, from the hole to the rim.
///
/// Half of the rings lie in the contact, clustered at its edge with the exponent 3/2; the others
/// grow geometrically. Where contact reaches the rim all are equally wide.
pub fn edges(hole_radius: f64, contact_radius: f64, rim_radius: f64, rings: usize) -> Vec<f64> {
    let (a, c) = (hole_radius, contact_radius);
    if !(c < rim_radius * (1.0 - 1e-9)) {
        return (0..=rings)
            .map(|ring| a + (rim_radius - a) * ring as f64 / rings as f64)
            .collect();
    }
    let inside = rings / 2;
    let outside = rings - inside;
    let clustered = (0..=inside).map(|ring| {
        let s = ring as f64 / inside as f64;
        a + (c - a) * (1.0 - (1.0 - s).powf(1.5))
    });
    let growing = (1..=outside).map(|ring| c * (rim_radius / c).powf(ring as f64 / outside as f64));
    clustered.chain(growing).collect()
}

/// Two equal annular plates about one bolt.
#[derive(Clone, Debug, PartialEq)]
pub struct Annulus {
    /// Radii that bound the rings, m, rising from the hole to the rim.
    pub edges: Vec<f64>,
    /// Thickness of both plates, m.
    pub thickness: [f64; 2],
    /// Conductivity of both plates, W/(m K).
    pub conductivity: [f64; 2],
}

/// Where heat enters and leaves an annular pair.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ends {
    /// Both outer faces isothermal.
    Isothermal,
    /// Uniform flux on both outer faces; area-mean temperatures.
    Flux,
    /// Rim of the first plate to rim of the second, outer faces insulated.
    Lap,
}

impl Annulus {
    /// The rings of the pair, one patch each.
    pub fn rings(&self) -> Rings {
        let area: Vec<f64> = self
            .edges
            .windows(2)
            .map(|pair| PI * (pair[1] - pair[0]) * (pair[1] + pair[0]))
            .collect();
        let (shape, rim_shape) = shapes(self.edges[0], &area);
        Rings {
            plate_area: [area.clone(), area.clone()],
            source_area: area.clone(),
            shape: [shape.clone(), shape],
            rim_shape: [rim_shape; 2],
            first_patch: (0..=area.len()).collect(),
            patch_area: area,
        }
    }

    /// Resistance between the ends for a conductance of the radius, W/(m² K), K/W.
    ///
    /// The conductance is taken at ring centres. Infinite where no path leads through.
    pub fn resistance(&self, conductance: impl Fn(f64) -> f64, ends: Ends) -> f64 {
        let rings = self.rings();
        let conductance: Vec<f64> = self
            .edges
            .windows(2)
            .map(|pair| conductance(0.5 * (pair[0] + pair[1])))
            .collect();
        let face: f64 = rings.patch_area.iter().sum();
        let (inlet, outlet) = match ends {
            Ends::Isothermal => (Inlet::Temperature, Outlet::Film(f64::INFINITY)),
            Ends::Flux => (Inlet::Flux(face.recip()), Outlet::Flux(face.recip())),
            Ends::Lap => (Inlet::Rim, Outlet::Rim),
        };
        let plates = Plates {
            thickness: self.thickness,
            conductivity: self.conductivity,
            inlet,
            outlet,
        };
        rings
            .flow(&plates, &conductance)
            .map_or(f64::INFINITY, |flow| match ends {
                Ends::Isothermal | Ends::Lap => flow.heat.recip(),
                Ends::Flux => (flow.source - flow.back) / face,
            })
    }
}
