//! Heat through two plates around one bolt: one mean temperature per plate and ring.
//!
//! The flux field behind the network is admissible: radial flux uniform over the thickness, axial
//! flux linear through each plate. By the complementary energy principle the resistance of a
//! round pair of equal discs is an upper bound for the conductance used, up to the rings.

use crate::{
    numerics::block_tridiagonal::Ladder,
    resistance::column::{Columns, Coupling, Flow, Inlet, Outlet, Plates},
};

/// Rings of both plates around one bolt, as areas and shape factors; lengths in m.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Rings {
    /// Areas of the rings.
    pub columns: Columns,
    /// Between ring centres, conductance over conductivity and thickness; 0 beside an empty ring.
    pub shape: [Vec<f64>; 2],
    /// From each ring centre to the part of its outer edge where the plate ends: the angle lost to
    /// the next ring over ln(e/r).
    pub rim_shape: [Vec<f64>; 2],
}

impl Rings {
    /// Temperatures and heat for the conductance of each patch, W/(m² K), 0 and infinity allowed;
    /// none when no path leads from source to sink.
    pub fn flow(&self, plates: &Plates, conductance: &[f64]) -> Option<Flow> {
        let count = self.columns.count();
        let constants = plates.constants();
        let couplings: Vec<Coupling> = (0..count)
            .map(|ring| self.columns.couple(ring, &constants, conductance))
            .collect();
        // Apart, the first plate would float, and rounding could pass for a path.
        if couplings.iter().map(Coupling::total).sum::<f64>() <= 0.0 {
            return None;
        }
        let mut ladder = Ladder::new(count);
        let mut load = vec![[0.0; 2]; count];
        for ring in 0..count {
            for plate in 0..2 {
                if ring + 1 < count {
                    ladder.link(
                        ring,
                        plate,
                        constants.sheet[plate] * self.shape[plate][ring],
                    );
                }
                let rim = constants.sheet[plate] * self.rim_shape[plate][ring];
                if plate == 0 && plates.inlet == Inlet::Rim {
                    ladder.rungs[ring][0] += rim;
                    load[ring][0] += rim;
                }
                if plate == 1 && plates.outlet == Outlet::Rim {
                    ladder.rungs[ring][2] += rim;
                }
                // A plate without area here keeps a node of its own at the coolant's temperature.
                if self.columns.plate_area[plate][ring] <= 0.0 {
                    ladder.rungs[ring][2 * plate] += 1.0;
                }
            }
            self.columns.fill(
                ring,
                &constants,
                &couplings[ring],
                (&mut ladder.rungs[ring], &mut load[ring]),
            );
        }
        // Given fluxes leave the level open: one ring is tied to it, and as what enters also
        // leaves, the tie carries nothing.
        if matches!(plates.outlet, Outlet::Flux(_)) {
            ladder.rungs[self.last(1)][2] += constants.sheet[1];
        }
        let temperatures = ladder.solution(load)?;
        let mut flow = Flow {
            hottest: f64::NEG_INFINITY,
            ..Flow::default()
        };
        for (ring, mean) in temperatures.into_iter().enumerate() {
            self.columns
                .read(ring, &constants, (&couplings[ring], mean), &mut flow);
        }
        Some(flow)
    }

    /// The last ring of a plate that has any area.
    fn last(&self, plate: usize) -> usize {
        self.columns.plate_area[plate]
            .iter()
            .rposition(|area| *area > 0.0)
            .unwrap_or(0)
    }
}

/// Radial shape factors between ring centres, and from each ring centre to the rim.
///
/// ```text
/// 1/S_j = ln(e/r_j)/Θ_j + ln(r_{j+1}/e)/Θ_{j+1},   Θ = 2A/(e_out² − e_in²)
/// rim:  (Θ_j − Θ_{j+1})/ln(e/r_j)
/// ```
///
/// e is the radius between the rings and Θ the angle over which the plate is there: 2π for a
/// whole ring, less where an edge or a neighbour's cell cuts it.
/// Valid: heat that runs along the radius, rings narrow against the change of Θ.
/// Source: the logarithm of Fourier's law between concentric circles; its use on cut rings is of this program.
pub fn shapes(hole_radius: f64, edges: &[f64], areas: &[f64]) -> (Vec<f64>, Vec<f64>) {
    let bounds = |ring: usize| (edges[ring].max(hole_radius), edges[ring + 1]);
    let angles: Vec<f64> = areas
        .iter()
        .enumerate()
        .map(|(ring, area)| {
            let (inner, outer) = bounds(ring);
            if *area > 0.0 {
                2.0 * area / ((outer - inner) * (outer + inner))
            } else {
                0.0
            }
        })
        .collect();
    let to_outer = |ring: usize| {
        let (inner, outer) = bounds(ring);
        (outer / (0.5 * (inner + outer))).ln()
    };
    let shape = (0..areas.len().saturating_sub(1))
        .map(|ring| {
            let (inner, outer) = bounds(ring + 1);
            let from_inner = (0.5 * (inner + outer) / inner).ln();
            let [here, next] = [angles[ring], angles[ring + 1]];
            if here > 0.0 && next > 0.0 {
                (to_outer(ring) / here + from_inner / next).recip()
            } else {
                0.0
            }
        })
        .collect();
    let rim = (0..areas.len())
        .map(|ring| {
            let next = angles.get(ring + 1).copied().unwrap_or(0.0);
            let lost = angles[ring] - next;
            if lost > 0.0 {
                lost / to_outer(ring)
            } else {
                0.0
            }
        })
        .collect();
    (shape, rim)
}

/// Radii that bound the rings of one bolt, from the hole to the rim.
///
/// Half of the rings lie in the contact, clustered at its edge with the exponent 3/2; the others
/// grow geometrically. Where contact reaches the rim all are equally wide.
pub fn edges(hole_radius: f64, contact_radius: f64, rim_radius: f64, rings: usize) -> Vec<f64> {
    let (a, c) = (hole_radius, contact_radius);
    if c >= rim_radius * (1.0 - 1e-9) {
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::resistance::annulus::Annulus;

    /// Unlike plates, heated inside a radius of 3, with a gap beyond the contact.
    fn heated_in_the_middle() -> (Rings, Vec<f64>) {
        let edges = edges(1.0, 2.5, 8.0, 60);
        let annulus = Annulus {
            thickness: [0.4, 1.1],
            conductivity: [2.0, 0.7],
            edges: edges.clone(),
        };
        let mut rings = annulus.rings();
        for (ring, area) in rings.columns.source_area.iter_mut().enumerate() {
            if edges[ring + 1] > 3.0 {
                *area = 0.0;
            }
        }
        let conductance = edges[1..]
            .iter()
            .map(|outer| if *outer < 2.5 { 9.0 } else { 0.02 })
            .collect();
        (rings, conductance)
    }

    #[test]
    fn heat_that_enters_leaves_through_the_film() {
        let (rings, conductance) = heated_in_the_middle();
        let film = 0.3;
        for inlet in [Inlet::Flux(0.8), Inlet::Temperature] {
            let plates = Plates {
                thickness: [0.4, 1.1],
                conductivity: [2.0, 0.7],
                inlet,
                outlet: Outlet::Film(film),
            };
            let flow = rings.flow(&plates, &conductance).unwrap();
            // Rounding of sixty rings.
            assert!(
                (flow.back * film / flow.heat - 1.0).abs() < 1e-10,
                "{flow:?}"
            );
        }
    }

    #[test]
    fn one_temperature_over_the_source_resists_less_than_even_flux() {
        let (rings, conductance) = heated_in_the_middle();
        let heated: f64 = rings.columns.source_area.iter().sum();
        let resistance = |inlet| {
            let plates = Plates {
                thickness: [0.4, 1.1],
                conductivity: [2.0, 0.7],
                inlet,
                outlet: Outlet::Film(f64::INFINITY),
            };
            let flow = rings.flow(&plates, &conductance).unwrap();
            flow.source / heated / flow.heat
        };
        let (even, held) = (resistance(Inlet::Flux(1.0)), resistance(Inlet::Temperature));
        assert!(held < even && held > 0.5 * even, "{held} {even}");
    }

    #[test]
    fn without_any_joint_no_heat_flows() {
        let (rings, conductance) = heated_in_the_middle();
        let plates = Plates {
            thickness: [0.4, 1.1],
            conductivity: [2.0, 0.7],
            inlet: Inlet::Flux(1.0),
            outlet: Outlet::Film(1.0),
        };
        assert_eq!(rings.flow(&plates, &vec![0.0; conductance.len()]), None);
    }

    // The network is linear: heat drawn out leaves below the coolant what heat put in leaves above it.
    #[test]
    fn heat_drawn_out_leaves_every_place_below_the_coolant() {
        let (mut rings, conductance) = heated_in_the_middle();
        // Even all over, so that the hottest place is every place of its face.
        rings.columns.source_area = rings.columns.plate_area[0].clone();
        let even = vec![2.0; conductance.len()];
        let hottest = |flux: f64| {
            let plates = Plates {
                thickness: [0.4, 1.1],
                conductivity: [2.0, 0.7],
                inlet: Inlet::Flux(flux),
                outlet: Outlet::Film(0.3),
            };
            rings.flow(&plates, &even).unwrap().hottest
        };
        // q (t1/k1 + 1/h + t2/k2 + 1/h_s).
        let depth = 0.4 / 2.0 + 1.0 / 2.0 + 1.1 / 0.7 + 1.0 / 0.3;
        for flux in [0.8, -0.8] {
            // Rounding of sixty rings.
            assert!((hottest(flux) / (flux * depth) - 1.0).abs() < 1e-10);
        }
    }

    #[test]
    fn rings_are_even_where_contact_reaches_the_rim() {
        for contact in [4.0, 5.0, f64::INFINITY] {
            let edges = edges(1.0, contact, 4.0, 12);
            for (ring, edge) in edges.iter().enumerate() {
                assert!((edge - 1.0 - 0.25 * ring as f64).abs() < 1e-14, "{edges:?}");
            }
        }
        // Elsewhere a line stands at the edge of contact, half of the rings within.
        let edges = edges(1.0, 2.5, 8.0, 12);
        assert_eq!(edges.len(), 13);
        assert!((edges[6] - 2.5).abs() < 1e-14 && (edges[12] - 8.0).abs() < 1e-13);
        assert!(edges.windows(2).all(|pair| pair[0] < pair[1]));
    }
}
