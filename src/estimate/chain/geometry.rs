//! What force and heat find in the plates, whatever the torque: cones, cells, plan grid.

use std::sync::Arc;

use crate::{
    estimate::{Failure, chain::levels::FINENESS},
    joint::{Engagement, Fastener, Joint, Outline, Plate},
    pressure::{self, Cone, Pair},
    resistance::{Cells, Hole, Plan, PlanGrid, Site, cells, cells::DEFAULT_RINGS, plan_grid},
};

/// Everything that plates and places of a joint decide alone.
#[derive(Debug)]
pub(super) struct Geometry {
    /// Bolts that are there, counted from 0 in file order; pairs, cones and cells are theirs.
    pub(super) clamping: Vec<usize>,
    pub(super) pairs: Vec<Pair>,
    pub(super) cones: Vec<Cone>,
    pub(super) cells: Arc<Cells>,
    /// The plates whole, where bolts share them; none for one bolt in the middle of two discs.
    pub(super) grid: Option<PlanGrid>,
}

impl Geometry {
    pub(super) fn new(joint: &Joint) -> Result<Self, Failure> {
        let beyond = joint.needs_elastic();
        // What closed forms know no heat paths of is named there as well.
        let ends = joint.source.alone().zip(joint.sink.alone());
        let Some((source, sink)) = ends.filter(|_| beyond.is_empty()) else {
            return Err(Failure::BeyondCone(beyond));
        };
        let bolts: Vec<(&Fastener, [f64; 2])> = joint.bolts().collect();
        let (missing, clamping): (Vec<usize>, Vec<usize>) =
            (0..bolts.len()).partition(|bolt| joint.is_missing(*bolt));
        let held = || clamping.iter().map(|bolt| bolts[*bolt]);
        let pairs: Vec<Pair> = held()
            .map(|(fastener, place)| pair(joint, fastener, place))
            .collect();
        let cones: Vec<Cone> = pairs
            .iter()
            .map(|pair| pressure::cone(pair, joint.contact.cone, joint.contact.shape))
            .collect();
        let sites = held()
            .zip(&cones)
            .map(|((fastener, at), cone)| Site {
                at,
                hole_radius: fastener.outer_holes(),
                cone: *cone,
            })
            .collect();
        let plates = [joint.warm(), joint.cold()];
        let cells = Arc::new(cells(&Plan {
            outlines: plates.map(|plate| (plate.outline.clone(), plate.origin)),
            thickness: plates.map(|plate| plate.thickness),
            sites,
            empty: missing
                .iter()
                .map(|bolt| Hole {
                    at: bolts[*bolt].1,
                    radius: bolts[*bolt].0.outer_holes(),
                })
                .collect(),
            source,
            sink,
            rings: DEFAULT_RINGS,
        })?);
        let grid = if cells.is_round() {
            None
        } else {
            Some(plan_grid(&cells, FINENESS)?)
        };
        Ok(Self {
            clamping,
            pairs,
            cones,
            cells,
            grid,
        })
    }
}

/// Two plates and a bolt as the closed form sees them.
///
/// Where head and nut press on different annuli the smaller counts: it makes the contact smaller.
fn pair(joint: &Joint, fastener: &Fastener, place: [f64; 2]) -> Pair {
    let plates = [joint.warm(), joint.cold()];
    let head = fastener.head_seat.outer_radius;
    let bearing_radius = match (fastener.engagement, fastener.nut_seat) {
        (Engagement::Nut, Some(nut)) => head.min(nut.outer_radius),
        _ => head,
    };
    Pair {
        hole_radius: fastener.widest_hole(),
        bearing_radius,
        rim_radius: plates
            .map(|plate| rim(plate, place))
            .into_iter()
            .fold(f64::INFINITY, f64::min),
        thickness: plates.map(|plate| plate.thickness),
        plane_modulus: plates.map(|plate| {
            let nu = plate.material.poisson.value;
            plate.material.youngs_modulus.value / (1.0 - nu * nu)
        }),
    }
}

/// Radius of the rim of a round plate about a bolt in its centre, m; elsewhere the plate is wide.
fn rim(plate: &Plate, place: [f64; 2]) -> f64 {
    match plate.outline {
        Outline::Disc { radius }
            if (place[0] - plate.origin[0]).hypot(place[1] - plate.origin[1]) < 1e-6 * radius =>
        {
            radius
        }
        _ => f64::INFINITY,
    }
}
