//! A joint as the elastic contact takes it: bodies of layers, interfaces, bolts.

use crate::{
    estimate::{
        Failure, Watch,
        chain::elastic::{
            columns::{
                storeys::{Storey, body, storeys},
                terminals::heat_zones,
            },
            variant::Variant,
        },
    },
    joint::{self, Engagement, Fastener, Joint, Zone},
    pressure::elastic::{
        self, Annulus, Bolt, End, Fineness, Height, Interface, Problem, Progress, Stage,
    },
};

/// What a problem asks for besides the joint.
#[derive(Clone, Copy)]
pub(super) struct Task<'a> {
    pub(super) variant: Variant,
    pub(super) fineness: Fineness,
    /// Clamp force of each bolt, N.
    pub(super) forces: &'a [f64],
    /// Pressure over closure of the asperities of each interface, Pa/m; none where they do not yield.
    pub(super) asperities: &'a [Option<f64>],
    pub(super) most_bytes: u64,
    pub(super) watch: &'a Watch,
}

/// Which end of the stack the bolts' threads hold.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Order {
    /// Heads press on the first plate: the stack stands as in the file.
    AsListed,
    /// Heads press on the last plate, threads hold in the first: the stack stands upside down.
    Reversed,
}

impl Order {
    /// The order that puts every threaded plate last.
    ///
    /// Through bolts do not mind; threads in both plates are refused.
    pub(super) fn of(joint: &Joint) -> Result<Self, Failure> {
        let threaded = joint
            .fasteners
            .iter()
            .filter(|fastener| !matches!(fastener.engagement, Engagement::Nut));
        let (mut listed, mut reversed) = (false, false);
        for fastener in threaded {
            if fastener.head_plate == 0 {
                listed = true;
            } else {
                reversed = true;
            }
        }
        match (listed, reversed) {
            (true, true) => Err(Failure::ThreadsInBothPlates),
            (false, true) => Ok(Self::Reversed),
            _ => Ok(Self::AsListed),
        }
    }

    /// Index in the file of a body (or of an interface, when their number is given) counted from
    /// the heads, and the other way round.
    pub(super) fn plate(self, body: usize, plates: usize) -> usize {
        match self {
            Self::AsListed => body,
            Self::Reversed => plates - 1 - body,
        }
    }
}

/// Hands the problem of a joint to `work`; the covers live as long as the call.
pub(super) fn with_problem<T>(
    joint: &Joint,
    order: Order,
    task: &Task,
    work: impl FnOnce(&Problem) -> T,
) -> T {
    let plates: Vec<usize> = (0..joint.plates.len())
        .map(|body| order.plate(body, joint.plates.len()))
        .collect();
    let covers: Vec<Vec<Storey>> = plates
        .iter()
        .enumerate()
        .map(|(body, plate)| storeys((joint, *plate), body == 0))
        .collect();
    let bodies = plates
        .iter()
        .zip(&covers)
        .map(|(plate, storeys)| body(&joint.plates[*plate], storeys))
        .collect();
    let count = joint.interfaces();
    let gaps: Vec<Box<Height>> = (0..count)
        .map(|index| {
            let interface = order.plate(index, count);
            let gap = move |point| task.variant.initial_gap((joint, interface), point);
            Box::new(gap) as Box<Height>
        })
        .collect();
    let interfaces = gaps
        .iter()
        .enumerate()
        .map(|(index, gap)| Interface {
            gap: gap.as_ref(),
            faces: task.variant.faces(joint),
            compliance: compliance((joint, order.plate(index, count)), task),
        })
        .collect();
    let tell = |progress: Progress| task.watch.tell(&told(task.fineness, &progress));
    let problem = Problem {
        bodies,
        interfaces,
        bolts: bolts(joint, order, task.forces),
        stops: [0, 1].map(|axis| stops(joint, axis)),
        head: task.variant.head(joint),
        fineness: task.fineness,
        most_bytes: task.most_bytes,
        progress: Some(&tell),
    };
    work(&problem)
}

/// What yields between the faces besides the plates.
///
/// A pad of known stiffness spreads the load; a paste or a fluid flows away from it and leaves the
/// faces as they are.
fn compliance((joint, interface): (&Joint, usize), task: &Task) -> elastic::Compliance {
    if let Some(stiffness) = joint.filler(interface).and_then(joint::Filler::stiffness) {
        return elastic::Compliance::Layer { stiffness };
    }
    task.asperities[interface].map_or(elastic::Compliance::Hard, |stiffness| {
        elastic::Compliance::Asperities { stiffness }
    })
}

fn bolts(joint: &Joint, order: Order, forces: &[f64]) -> Vec<Bolt> {
    let count = joint.plates.len();
    joint
        .bolts()
        .zip(forces)
        .map(|((fastener, at), force)| {
            let (head, end) = ends(fastener, order, count);
            Bolt {
                at,
                head,
                force: *force,
                hole_radii: (0..count)
                    .map(|body| fastener.hole_radius[order.plate(body, count)])
                    .collect(),
                end,
            }
        })
        .collect()
}

/// What presses on the first body and what holds at the last.
fn ends(fastener: &Fastener, order: Order, plates: usize) -> (Annulus, End) {
    let annulus = |seat: joint::Seat| Annulus {
        inner: seat.inner_radius,
        outer: seat.outer_radius,
    };
    let head = annulus(fastener.head_seat);
    let body_of_head = match order {
        Order::AsListed => fastener.head_plate,
        Order::Reversed => plates - 1 - fastener.head_plate,
    };
    match fastener.engagement {
        Engagement::Nut => {
            let nut = fastener.nut_seat.map_or(head, annulus);
            if body_of_head == 0 {
                (head, End::Nut(nut))
            } else {
                (nut, End::Nut(head))
            }
        }
        Engagement::Tapped { length } | Engagement::Insert { length } => {
            let threaded = fastener.outer_holes()[usize::from(fastener.head_plate == 0)];
            (
                head,
                End::Thread {
                    radius: threaded.max(0.5 * fastener.thread.diameter),
                    length,
                },
            )
        }
    }
}

/// Where grid lines are wanted: straight edges of plates and of heated and cooled zones.
fn stops(joint: &Joint, axis: usize) -> Vec<f64> {
    let mut found: Vec<f64> = joint
        .plates
        .iter()
        .flat_map(|plate| plate.stops(axis))
        .collect();
    for zone in heat_zones(joint) {
        if let Zone::Rectangle { centre, size } = zone {
            found.push(centre[axis] - 0.5 * size[axis]);
            found.push(centre[axis] + 0.5 * size[axis]);
        }
    }
    found
}

fn told(fineness: Fineness, progress: &Progress) -> String {
    let name = match fineness {
        Fineness::Coarse => "coarse",
        Fineness::Fast => "fast",
        Fineness::Normal => "normal",
        Fineness::Fine => "fine",
    };
    match progress.stage {
        Stage::Grid => format!("elastic contact, {name}: grid"),
        Stage::Matrices => format!("elastic contact, {name}: matrices"),
        Stage::Contact => format!(
            "elastic contact, {name}: step {}, residual {:.1e}",
            progress.step, progress.residual
        ),
    }
}
