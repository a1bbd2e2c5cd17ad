//! Where heat enters and leaves a joint, and the bolts beside the faces, as the columns take them.

use crate::{
    estimate::chain::conditions::Conditions,
    joint::{self, CooledPart, Cooling, Engagement, Heating, Joint, Outline, radiative_film},
    resistance::columns::{Bolt, Edge, Rim, Seat, Sink, Source, Terminals, Zone},
};

/// Wall beside a thread that takes its heat, in hole radii (judgement: it stands for the threads,
/// and the resistance of the bolt hardly feels it).
const WALL: f64 = 1.25;

/// Source, sinks and bolts of a joint before any conditions.
#[derive(Clone, Debug)]
pub(super) struct Ends {
    source: Source,
    sinks: Vec<Drain>,
    /// Bolts without conductance: places and seats.
    bolts: Vec<Bolt>,
}

/// A sink, some of which follow the temperature.
#[derive(Clone, Debug)]
enum Drain {
    Steady(Sink),
    /// The whole back radiates; its emissivity.
    Radiating(f64),
}

impl Ends {
    pub(super) fn of(joint: &Joint) -> Self {
        Self {
            source: source(joint),
            sinks: sinks(joint),
            bolts: bolts(joint),
        }
    }

    /// Whether a sink follows the temperature.
    pub(super) fn radiates(&self) -> bool {
        let mut sinks = self.sinks.iter();
        sinks.any(|sink| matches!(sink, Drain::Radiating(_)))
    }

    /// The same under conditions: shanks conduct, a back radiates about its temperature.
    pub(super) fn under(&self, conditions: &Conditions) -> Terminals {
        let sink = |sink: &Drain| match sink {
            Drain::Steady(sink) => sink.clone(),
            Drain::Radiating(emissivity) => Sink::Film {
                zone: Zone::Face,
                coefficient: radiative_film(*emissivity, conditions.temperature),
            },
        };
        let bolts = self.bolts.iter().zip(&conditions.shanks);
        Terminals {
            source: self.source.clone(),
            sinks: self.sinks.iter().map(sink).collect(),
            bolts: bolts
                .map(|(bolt, strength)| Bolt {
                    strength: *strength,
                    ..*bolt
                })
                .collect(),
        }
    }
}

/// Every heated and cooled zone, in joint coordinates.
pub(super) fn heat_zones(joint: &Joint) -> Vec<joint::Zone> {
    let mut found: Vec<joint::Zone> = joint
        .source
        .zones()
        .into_iter()
        .map(|each| each.0)
        .collect();
    if let Cooling::Parts(parts) = &joint.sink {
        let origin = joint.cold().origin;
        for part in parts {
            if let CooledPart::Film { zone, .. } | CooledPart::Held(zone) = part {
                found.push(zone.moved(origin));
            }
        }
    }
    found
}

fn source(joint: &Joint) -> Source {
    let zones = joint.source.zones().into_iter();
    match &joint.source {
        Heating::One(source) if source.isothermal => {
            Source::Isothermal(vec![Zone::from(source.zone)])
        }
        Heating::One(_) | Heating::Several(_) => {
            Source::Flux(zones.map(|(zone, heat)| (Zone::from(zone), heat)).collect())
        }
    }
}

fn sinks(joint: &Joint) -> Vec<Drain> {
    let steady = |sinks: Vec<Sink>| sinks.into_iter().map(Drain::Steady).collect();
    match &joint.sink {
        Cooling::Whole(joint::Sink::IsothermalBack) => steady(vec![Sink::Held(Zone::Face)]),
        Cooling::Whole(joint::Sink::Film(coefficient)) => steady(vec![Sink::Film {
            zone: Zone::Face,
            coefficient: *coefficient,
        }]),
        Cooling::Whole(joint::Sink::Rim) => steady(rim(joint)),
        Cooling::Parts(parts) => parts.iter().flat_map(|part| drains(joint, part)).collect(),
    }
}

fn drains(joint: &Joint, part: &CooledPart) -> Vec<Drain> {
    let origin = joint.cold().origin;
    let sinks = match part {
        CooledPart::Radiation { emissivity } => return vec![Drain::Radiating(*emissivity)],
        CooledPart::Film { zone, coefficient } => vec![Sink::Film {
            zone: Zone::from(zone.moved(origin)),
            coefficient: *coefficient,
        }],
        CooledPart::Held(zone) => vec![Sink::Held(Zone::from(zone.moved(origin)))],
        CooledPart::Edge(edge) => vec![Sink::Rim(Rim::Straight(side(*edge)))],
        CooledPart::Rim => rim(joint),
    };
    sinks.into_iter().map(Drain::Steady).collect()
}

fn side(edge: joint::Edge) -> Edge {
    match edge {
        joint::Edge::Left => Edge::West,
        joint::Edge::Right => Edge::East,
        joint::Edge::Lower => Edge::South,
        joint::Edge::Upper => Edge::North,
    }
}

fn rim(joint: &Joint) -> Vec<Sink> {
    match &joint.cold().outline {
        Outline::Disc { radius } => vec![Sink::Rim(Rim::Round {
            centre: joint.cold().origin,
            radius: *radius,
        })],
        // Of a polygon the outermost cells in every row of the grid.
        Outline::Rectangle { .. } | Outline::Polygon { .. } => {
            [Edge::West, Edge::East, Edge::South, Edge::North]
                .map(|edge| Sink::Rim(Rim::Straight(edge)))
                .to_vec()
        }
    }
}

/// Heads and seats of the bolts on the outer faces, warm side first.
fn bolts(joint: &Joint) -> Vec<Bolt> {
    joint
        .bolts()
        .map(|(fastener, at)| {
            let head = ring(fastener.head_seat);
            let nut = fastener.nut_seat.map_or(head, ring);
            let below = usize::from(fastener.head_plate == 0);
            let wall = fastener.hole_radius[below].max(0.5 * fastener.thread.diameter);
            let wall = [0.0, WALL * wall];
            let (above, seat) = match (fastener.engagement, below) {
                (Engagement::Nut, 1) => (head, Seat::Nut { annulus: nut }),
                (Engagement::Nut, _) => (nut, Seat::Nut { annulus: head }),
                (Engagement::Tapped { length } | Engagement::Insert { length }, 1) => {
                    let seat = Seat::Thread {
                        annulus: wall,
                        depth: length,
                    };
                    (head, seat)
                }
                // The thread is in the warm plate: it takes its heat from around the hole.
                (Engagement::Tapped { .. } | Engagement::Insert { .. }, _) => {
                    (wall, Seat::Nut { annulus: head })
                }
            };
            Bolt {
                at,
                head: above,
                seat,
                strength: 0.0,
            }
        })
        .collect()
}

fn ring(seat: crate::joint::Seat) -> [f64; 2] {
    [seat.inner_radius, seat.outer_radius]
}
