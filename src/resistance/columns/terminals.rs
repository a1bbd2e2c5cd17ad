//! Where heat enters, where it leaves, and what bolts carry beside the faces.

use crate::{
    numerics::columns::Plan,
    resistance::{
        Failure,
        columns::{Side, Stack, Zone, zone::Covered},
    },
};

/// One of the four straight edges.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Edge {
    /// At the smallest x.
    West,
    /// At the largest x.
    East,
    /// At the smallest y.
    South,
    /// At the largest y.
    North,
}

/// A side of a body, over its whole height.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Rim {
    /// A straight edge: the outermost cells of the body.
    Straight(Edge),
    /// The rim of a disc.
    Round {
        /// Centre, m.
        centre: [f64; 2],
        /// Radius, m.
        radius: f64,
    },
}

/// How heat enters the first body.
#[derive(Clone, Debug, PartialEq)]
pub enum Source {
    /// Zones of its outer face with uniform flux, each with its share of the heat.
    Flux(Vec<(Zone, f64)>),
    /// Zones of its outer face at one temperature.
    Isothermal(Vec<Zone>),
    /// Uniform flux over a side.
    Rim(Rim),
}

/// How heat leaves the last body; its back unless said otherwise.
#[derive(Clone, Debug, PartialEq)]
pub enum Sink {
    /// A film to the coolant on a zone of the back.
    Film {
        /// The wetted zone.
        zone: Zone,
        /// Film coefficient, W/(m² K).
        coefficient: f64,
    },
    /// A zone of the back at one temperature.
    Held(Zone),
    /// A side at one temperature.
    Rim(Rim),
}

/// Where the lower end of a bolt gives off its heat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Seat {
    /// Below a nut on the back.
    Nut {
        /// Inner and outer radius of the annulus, m.
        annulus: [f64; 2],
    },
    /// Into the wall of a tapped hole.
    Thread {
        /// Inner and outer radius of the wall that takes the heat, m.
        annulus: [f64; 2],
        /// How far the thread bears below the top of the last body, m.
        depth: f64,
    },
}

/// A bolt as a conductor from its head to its seat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bolt {
    /// Axis, m.
    pub at: [f64; 2],
    /// Inner and outer radius of the annulus under the head, m.
    pub head: [f64; 2],
    /// The other end.
    pub seat: Seat,
    /// Conductance from head to seat, its own contacts included, W/K; 0 isolates.
    pub strength: f64,
}

/// All that joins the stack to the world.
#[derive(Clone, Debug, PartialEq)]
pub struct Terminals {
    /// Where heat enters.
    pub source: Source,
    /// Where heat leaves, all to the same temperature.
    pub sinks: Vec<Sink>,
    /// Bolts; the nearest one owns a column of the faces.
    pub bolts: Vec<Bolt>,
}

/// One node of a body with integrals for every column.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Patch {
    pub node: usize,
    pub covered: Covered,
    pub grip: Grip,
}

/// How a patch couples to a temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Grip {
    /// Not at all: a flux.
    None,
    /// A film, W/(m² K).
    Film(f64),
    /// As stiff as the equations bear.
    Held,
    /// Cells that the outline cuts: conductivity in the plane over a part of the cell.
    Cut(f64),
    /// A side: the same.
    Side(f64),
}

/// A bolt's two ends: body, node, column and weight; either adds up to one.
pub(super) type BoltEnds = [Vec<(usize, usize, usize, f64)>; 2];

/// Zones of the source, the sinks and the bolts put on the columns.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Ends {
    /// For every zone its patches and its share of the heat.
    pub source: Vec<(Vec<Patch>, f64)>,
    pub isothermal: bool,
    pub sinks: Vec<Patch>,
    /// None where an end meets no solid.
    pub bolts: Vec<Option<BoltEnds>>,
}

/// A straight side is held through this share of a cell.
const THIN: f64 = 1e-6;
/// A round rim is held through this share of a cell: stiffer would force zero into every cell that
/// the rim crosses and make the disc smaller, softer would leave a film.
const FRACTION: f64 = 0.125;
/// Cells that the outline of a held zone cuts are held through this share of a cell; see
/// `an_isothermal_disc_spreads_as_in_the_handbook`.
const CUT: f64 = 0.125;

impl Ends {
    pub(super) fn new(stack: &Stack, terminals: &Terminals) -> Result<Self, Failure> {
        let plan = stack.plan();
        let first = &stack.bodies[0];
        let tops = first.open_faces(Side::Up);
        let source: Vec<(Vec<Patch>, f64)> = match &terminals.source {
            Source::Flux(zones) => zones
                .iter()
                .map(|(zone, share)| (patches(plan, zone, (&tops, Grip::None)), *share))
                .collect(),
            Source::Isothermal(zones) => {
                let all = zones
                    .iter()
                    .flat_map(|zone| held_patches(plan, zone, &tops));
                vec![(all.collect(), 1.0)]
            }
            Source::Rim(rim) => vec![(rim_patches(stack, 0, (rim, Grip::None)), 1.0)],
        };
        let area = |patches: &[Patch]| patches.iter().map(|p| p.covered.area()).sum::<f64>();
        let whole: f64 = source.iter().map(|(_, share)| share).sum();
        let sound = source
            .iter()
            .all(|(patches, share)| area(patches) > 0.0 && share.is_finite() && *share >= 0.0);
        if !(sound && whole > 0.0) {
            return Err(Failure::Misfit {
                what: "every heated zone must cover solid and take a share of the heat",
            });
        }
        let sinks = sinks(stack, &terminals.sinks)?;
        Ok(Self {
            source: source
                .into_iter()
                .map(|(patches, share)| (patches, share / whole))
                .collect(),
            isothermal: matches!(terminals.source, Source::Isothermal(_)),
            sinks,
            bolts: terminals
                .bolts
                .iter()
                .map(|bolt| bolt_ends(stack, bolt, &tops))
                .collect(),
        })
    }

    /// Whether heat leaves through a side, so that it need not cross the thickness.
    pub(super) fn leaves_by_side(&self) -> bool {
        self.sinks
            .iter()
            .any(|patch| matches!(patch.grip, Grip::Side(_)))
    }
}

fn patches(plan: &Plan, zone: &Zone, (levels, grip): (&[(usize, Vec<f64>)], Grip)) -> Vec<Patch> {
    levels
        .iter()
        .map(|(node, shares)| Patch {
            node: *node,
            covered: zone.covered(plan, shares),
            grip,
        })
        .filter(|patch| patch.covered.area() > 0.0)
        .collect()
}

/// A zone at one temperature: stiff in the cells it fills, softer in those that its outline cuts.
fn held_patches(plan: &Plan, zone: &Zone, levels: &[(usize, Vec<f64>)]) -> Vec<Patch> {
    levels
        .iter()
        .flat_map(|(node, shares)| {
            let grips = [Grip::Held, Grip::Cut(CUT.recip())];
            let both = zone.gripped(plan, shares).into_iter().zip(grips);
            both.map(|(covered, grip)| Patch {
                node: *node,
                covered,
                grip,
            })
        })
        .filter(|patch| patch.covered.area() > 0.0)
        .collect()
}

/// A side of a body: every node has its share of the height.
fn rim_patches(stack: &Stack, body: usize, (rim, grip): (&Rim, Grip)) -> Vec<Patch> {
    let body = &stack.bodies[body];
    let sides: Vec<Covered> = body
        .layers
        .iter()
        .map(|layer| rim.covered(&stack.plan, &layer.shares))
        .collect();
    body.span([0.0, body.thickness()])
        .into_iter()
        .map(|(node, height, layer)| Patch {
            node,
            covered: sides[layer].times(height),
            grip,
        })
        .filter(|patch| patch.covered.area() > 0.0)
        .collect()
}

fn sinks(stack: &Stack, sinks: &[Sink]) -> Result<Vec<Patch>, Failure> {
    let misfit = |what: &'static str| Err(Failure::Misfit { what });
    let plan = &stack.plan;
    let last = stack.bodies.len() - 1;
    let backs = stack.bodies[last].open_faces(Side::Down);
    let mut all = Vec::new();
    for sink in sinks {
        let found = match sink {
            Sink::Film { zone, coefficient } => {
                if !(coefficient.is_finite() && *coefficient > 0.0) {
                    return misfit("a film needs a coefficient above zero");
                }
                patches(plan, zone, (&backs, Grip::Film(*coefficient)))
            }
            Sink::Held(zone) => held_patches(plan, zone, &backs),
            Sink::Rim(rim) => {
                let thin = match rim {
                    Rim::Straight(_) => THIN,
                    Rim::Round { .. } => FRACTION,
                };
                rim_patches(stack, last, (rim, Grip::Side(thin.recip())))
            }
        };
        if found.is_empty() {
            return misfit("every sink must cover solid");
        }
        all.extend(found);
    }
    if all.is_empty() {
        return misfit("heat needs a sink");
    }
    Ok(all)
}

/// Both ends of a bolt; none where one of them meets no solid.
fn bolt_ends(stack: &Stack, bolt: &Bolt, tops: &[(usize, Vec<f64>)]) -> Option<BoltEnds> {
    let last = stack.bodies.len() - 1;
    let ring = |annulus: [f64; 2], shares: &[f64]| -> Vec<f64> {
        let disc = |radius: f64| {
            let zone = Zone::Disc {
                centre: bolt.at,
                radius,
            };
            zone.covered(&stack.plan, shares).weights
        };
        let inner = disc(annulus[0]);
        let outer = disc(annulus[1]);
        outer
            .iter()
            .zip(inner)
            .map(|(o, i)| (o - i).max(0.0))
            .collect()
    };
    let level = |body: usize, annulus: [f64; 2], levels: &[(usize, Vec<f64>)]| {
        let mut entries = Vec::new();
        for (node, shares) in levels {
            for (column, weight) in ring(annulus, shares).into_iter().enumerate() {
                entries.push((body, *node, column, weight));
            }
        }
        entries
    };
    let head = level(0, bolt.head, tops);
    let seat = match bolt.seat {
        Seat::Nut { annulus } => level(last, annulus, &stack.bodies[last].open_faces(Side::Down)),
        Seat::Thread { annulus, depth } => {
            let body = &stack.bodies[last];
            let top = body.thickness();
            let rings: Vec<Vec<f64>> = body
                .layers
                .iter()
                .map(|layer| ring(annulus, &layer.shares))
                .collect();
            let mut entries = Vec::new();
            for (node, height, layer) in body.span([top - depth, top]) {
                for (column, weight) in rings[layer].iter().enumerate() {
                    entries.push((last, node, column, weight * height));
                }
            }
            entries
        }
    };
    let whole = |entries: Vec<(usize, usize, usize, f64)>| {
        let sum: f64 = entries.iter().map(|entry| entry.3).sum();
        (sum > 0.0).then(|| {
            entries
                .into_iter()
                .filter(|entry| entry.3 != 0.0)
                .map(|(body, node, column, weight)| (body, node, column, weight / sum))
                .collect::<Vec<_>>()
        })
    };
    Some([whole(head)?, whole(seat)?])
}
