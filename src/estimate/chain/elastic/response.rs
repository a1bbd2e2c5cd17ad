//! How the resistances answer to force, faces and conductivities: a surface for the draws.

use crate::{
    conductance::Local,
    estimate::chain::conditions::Conditions,
    numerics::surface::{Surface, design},
    resistance::Path,
};

/// Number of variables of the surface.
pub(super) const VARIABLES: usize = 5;
/// Half width of the design along each variable: force, contact, gap, both conductivities; as
/// logarithms of the ratio to nominal.
///
/// About where the draws lie: friction and tool move the force by a third, surfaces and laws the
/// contact by half, gas and roughness the gap by a fourth, conductivities by a few hundredths.
const STEPS: [f64; VARIABLES] = [0.35, 0.45, 0.25, 0.06, 0.06];
/// Largest factor on the force in the design.
pub(super) const FORCE_REACH: f64 = 1.42;
/// Places at which the surface is held against direct solutions, in half widths of the design.
const PROBES: [[f64; VARIABLES]; 4] = [
    [0.7, -0.6, 0.5, -0.8, 0.8],
    [-0.8, 0.7, -0.6, 0.5, -0.7],
    [-0.6, -0.8, 0.7, 0.7, 0.6],
    [0.8, 0.5, -0.7, -0.6, -0.5],
];

/// Departure of a state from the nominal one: logarithms of ratios.
pub(super) type Departure = [f64; VARIABLES];

/// What stands for the faces in a departure: conductance at one pressure and at one gap.
#[derive(Clone, Copy, Debug)]
pub(super) struct Gauge {
    /// Mean pressure as the force meets it, Pa.
    pub(super) pressure: f64,
    /// Mean gap, m.
    pub(super) gap: f64,
    force: f64,
    touching: f64,
    parted: f64,
    conductivity: [f64; 2],
}

impl Gauge {
    /// Reads the nominal conditions.
    pub(super) fn of(conditions: &Conditions, pressure: f64, gap: f64) -> Self {
        Self {
            pressure,
            gap,
            force: conditions.forces.iter().sum(),
            touching: conditions.faces.conductance(pressure),
            parted: conditions.faces.local.parted(gap),
            conductivity: conditions.conductivity,
        }
    }

    /// Where other conditions lie from the nominal ones.
    pub(super) fn departure(&self, conditions: &Conditions) -> Departure {
        let local: &Local = &conditions.faces.local;
        let ratio = |value: f64, nominal: f64| {
            if nominal > 0.0 && value > 0.0 {
                (value / nominal).ln()
            } else {
                // Nothing crosses an open gap in vacuum, in the nominal state as in any other.
                0.0
            }
        };
        [
            ratio(conditions.forces.iter().sum(), self.force),
            ratio(conditions.faces.conductance(self.pressure), self.touching),
            ratio(local.parted(self.gap), self.parted),
            ratio(conditions.conductivity[0], self.conductivity[0]),
            ratio(conditions.conductivity[1], self.conductivity[1]),
        ]
    }
}

/// The answers of one case as surfaces over the departure.
///
/// ```text
/// ln(R/R₀) for contact, perfect contact and what the joint adds;
/// node to node, interface and hottest as shares of source to sink
/// ```
#[derive(Clone, Debug)]
pub(super) struct Response {
    surfaces: [Surface; READINGS],
    /// Largest error of source to sink at the probes, relative.
    pub(super) error: f64,
}

const READINGS: usize = 6;

impl Response {
    /// Solves the design and the probes, and lays the surfaces through the former.
    pub(super) fn through<E>(
        solve: impl Fn(&[Departure]) -> Result<Vec<Path>, E>,
    ) -> Result<Self, E> {
        let points: Vec<Departure> = design(&STEPS)
            .iter()
            .map(|point| std::array::from_fn(|variable| point[variable]))
            .chain(PROBES.map(|probe| std::array::from_fn(|i| probe[i] * STEPS[i])))
            .collect();
        let paths = solve(&points)?;
        let (design, probes) = paths.split_at(paths.len() - PROBES.len());
        let read: Vec<[f64; READINGS]> = design.iter().map(readings).collect();
        let surfaces = std::array::from_fn(|reading| {
            let values: Vec<f64> = read.iter().map(|values| values[reading]).collect();
            Surface::through(&STEPS, &values)
        });
        let mut response = Self {
            surfaces,
            error: 0.0,
        };
        let centre = &design[0];
        for (path, departure) in probes.iter().zip(&points[design.len()..]) {
            let told = response.applied(centre, departure).source_to_sink;
            let off = (told / path.source_to_sink - 1.0).abs();
            response.error = response.error.max(off);
        }
        Ok(response)
    }

    /// The nominal path of a finer solution, moved as the surfaces say.
    pub(super) fn applied(&self, nominal: &Path, departure: &Departure) -> Path {
        let [contact, perfect, added, node, interface, hottest]: [f64; READINGS] =
            std::array::from_fn(|reading| {
                let surface = &self.surfaces[reading];
                surface.at(departure) - surface.at(&[0.0; VARIABLES])
            });
        let perfect_contact = nominal.perfect_contact * perfect.exp();
        let added_by_joint = nominal.added_by_joint * added.exp();
        let source_to_sink = perfect_contact + added_by_joint;
        let share =
            |value: f64, moved: f64| (value / nominal.source_to_sink + moved) * source_to_sink;
        Path {
            contact: nominal.contact * contact.exp(),
            perfect_contact,
            added_by_joint,
            source_to_sink,
            node_to_node: share(nominal.node_to_node, node),
            interface_drop: share(nominal.interface_drop, interface),
            hottest: share(nominal.hottest, hottest),
            ..nominal.clone()
        }
    }
}

fn readings(path: &Path) -> [f64; READINGS] {
    let whole = path.source_to_sink;
    [
        path.contact.ln(),
        path.perfect_contact.ln(),
        path.added_by_joint.max(f64::MIN_POSITIVE).ln(),
        path.node_to_node / whole,
        path.interface_drop / whole,
        path.hottest / whole,
    ]
}
