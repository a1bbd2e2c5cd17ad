//! Bounds of source to sink for the conductance used.

use crate::resistance::{
    annulus::Annulus,
    column::{Inlet as RingInlet, Outlet as RingOutlet, Plates},
    network::edges,
    round::{Condensed, Inlet, Outlet},
};

/// Rings of the network behind the upper bound.
const RINGS: usize = 200;

impl Condensed {
    /// Isothermal planes at the outer faces and at the interface can only help the heat.
    ///
    /// ```text
    /// 1/R ≤ 1/(t1/(k1 A1) + 1/G + t2/(k2 A2)) + G_b
    /// ```
    ///
    /// At a rim heat need not cross the thickness: no term for that plate.
    pub(super) fn lower(&self, contact: f64) -> f64 {
        let through = [0, 1].map(|plate| {
            let disc = &self.problem.plates[plate];
            disc.thickness / (disc.conductivity[1] * self.fine.plates[plate].area)
        });
        let first = match self.problem.inlet {
            Inlet::Rim => 0.0,
            Inlet::Flux(_) | Inlet::Isothermal(_) => through[0],
        };
        let second = match self.problem.outlet {
            Outlet::Rim => 0.0,
            _ => through[1],
        };
        let series = first + contact.recip() + second;
        (series.recip() + self.problem.shank).recip()
    }

    /// The ring network, where its flux is admissible: equal discs heated all over, one
    /// conductivity each. A shank left out only raises it.
    pub(super) fn upper(&self, conductance: &impl Fn(f64) -> f64) -> Option<f64> {
        let [first, second] = &self.problem.plates;
        let near = |a: f64, b: f64| (a - b).abs() <= 1e-9 * a.abs();
        let alike = near(first.hole_radius, second.hole_radius)
            && near(first.rim_radius, second.rim_radius)
            && [first, second]
                .iter()
                .all(|disc| near(disc.conductivity[0], disc.conductivity[1]));
        if !(alike && self.is_heated_all_over()) {
            return None;
        }
        let area = self.fine.plates[1].area;
        let inlet = match self.problem.inlet {
            Inlet::Flux(_) => RingInlet::Flux(area.recip()),
            Inlet::Isothermal(_) => RingInlet::Temperature,
            Inlet::Rim => RingInlet::Rim,
        };
        let outlet = match self.problem.outlet {
            Outlet::IsothermalBack => RingOutlet::Film(f64::INFINITY),
            Outlet::Film(film) => RingOutlet::Film(film),
            Outlet::Flux(_) if self.problem.covers(1) => RingOutlet::Flux(area.recip()),
            Outlet::Flux(_) => return None,
            Outlet::Rim => RingOutlet::Rim,
        };
        let annulus = Annulus {
            edges: edges(
                first.hole_radius,
                self.problem.contact_radius,
                first.rim_radius,
                RINGS,
            ),
            thickness: [first.thickness, second.thickness],
            conductivity: [first.conductivity[1], second.conductivity[1]],
        };
        let local: Vec<f64> = annulus
            .edges
            .windows(2)
            .map(|pair| conductance(0.5 * (pair[0] + pair[1])))
            .collect();
        let plates = Plates {
            thickness: annulus.thickness,
            conductivity: annulus.conductivity,
            inlet,
            outlet,
        };
        let flow = annulus.rings().flow(&plates, &local);
        let back = match self.problem.outlet {
            Outlet::Film(film) if film.is_finite() => (film * area).recip(),
            _ => 0.0,
        };
        Some(flow.map_or(f64::INFINITY, |flow| match (inlet, outlet) {
            (RingInlet::Flux(_), RingOutlet::Flux(_)) => (flow.source - flow.back) / area,
            (RingInlet::Flux(_), _) => flow.source / area / flow.heat - back,
            _ => flow.heat.recip() - back,
        }))
    }
}
