//! What a layout must keep: edge distance, pitch, keep-out zones, land under heads and nuts.

use crate::{
    joint::{Arrange, Fastener, Joint, Zone},
    layout::Size,
};

/// Edge distance in thread diameters where none is stated: common practice is 1.5 to 2.
const EDGE_DISTANCE: f64 = 2.0;
/// Pitch in thread diameters where none is stated: common practice is 2.5 to 3.
const PITCH: f64 = 3.0;
/// Steps along the longer side of the first plate where none is stated.
const STEPS: f64 = 12.0;
/// Room for rounding of places that stand exactly at a distance, m: places are whole micrometres.
const SLACK: f64 = 2e-6;

/// What was taken for what the file leaves out.
#[derive(Clone, Debug, PartialEq)]
pub struct Defaults {
    /// Field and value, as reports print them.
    pub taken: Vec<(&'static str, String)>,
}

impl Defaults {
    /// What a search of a joint takes for itself.
    pub fn of(joint: &Joint, arrange: &Arrange) -> Self {
        let mut taken = Vec::new();
        if joint.arrange.is_none() {
            let [fewest, most] = arrange.bolts;
            taken.push(("bolts", format!("{fewest} to {most}")));
            taken.push(("families", "edge, grid, circle, free".to_owned()));
        }
        if arrange.edge_distance.is_none() {
            let text = format!("{EDGE_DISTANCE} thread diameters, axis to edge, common practice");
            taken.push(("edge_distance", text));
        }
        if arrange.pitch.is_none() {
            taken.push((
                "pitch",
                format!("{PITCH} thread diameters, axis to axis, common practice"),
            ));
        }
        if arrange.step.is_none() {
            taken.push(("step", format!("{:.2} mm", 1e3 * step(joint, arrange))));
        }
        Self { taken }
    }
}

/// Lattice of free places, step of margins and circles, m.
pub(super) fn step(joint: &Joint, arrange: &Arrange) -> f64 {
    arrange.step.unwrap_or_else(|| {
        let [left, lower, right, upper] = joint.warm().bounds();
        (right - left).max(upper - lower) / STEPS
    })
}

/// What one size must keep in one joint.
#[derive(Clone, Debug)]
pub struct Constraints<'a> {
    joint: &'a Joint,
    group: usize,
    fastener: &'a Fastener,
    keep_out: &'a [Zone],
    /// Least distance from axis to edge, m.
    pub edge_distance: f64,
    /// Least distance from axis to axis, m.
    pub pitch: f64,
}

impl<'a> Constraints<'a> {
    /// Those of a size.
    pub fn new(size: &'a Size, arrange: &'a Arrange) -> Self {
        Self::of_group((&size.joint, 0), arrange)
    }

    /// Those of a fastener group of a joint.
    pub(super) fn of_group((joint, group): (&'a Joint, usize), arrange: &'a Arrange) -> Self {
        let fastener = &joint.fasteners[group];
        let diameter = fastener.thread.diameter;
        Self {
            joint,
            group,
            fastener,
            keep_out: &arrange.keep_out,
            edge_distance: arrange.edge_distance.unwrap_or(EDGE_DISTANCE * diameter),
            pitch: arrange.pitch.unwrap_or(PITCH * diameter),
        }
    }

    /// Least distance of a place from the edges, its seats included, m.
    fn land(&self, plate: usize) -> f64 {
        let far = self.joint.far_plate(self.fastener);
        let seat = if plate == self.fastener.head_plate {
            self.fastener.head_seat.outer_radius
        } else if plate == far {
            self.fastener.nut_seat.map_or(0.0, |nut| nut.outer_radius)
        } else {
            0.0
        };
        seat.max(self.fastener.hole_radius[plate])
    }

    /// By how much a place misses its distances, m; 0 where it keeps them.
    pub fn place_miss(&self, place: [f64; 2]) -> f64 {
        let mut miss: f64 = 0.0;
        for (index, plate) in self.joint.plates.iter().enumerate() {
            let needed = self.land(index).max(self.edge_distance);
            let own = plate.own(place);
            let depth = plate.depth(place);
            // A cut-out is an edge too.
            let clear = plate.cutouts.iter().map(|cutout| -cutout.depth(own));
            miss = miss.max(needed - clear.fold(depth, f64::min));
            if let Some(feet) = &plate.feet {
                let on = feet.at.iter().map(|foot| foot.depth(own));
                miss = miss.max(self.land(index) - on.fold(f64::NEG_INFINITY, f64::max));
            }
        }
        let head = self.fastener.head_seat.outer_radius;
        for zone in self.keep_out {
            miss = miss.max(head - distance(*zone, place));
        }
        for (other, at) in self.others() {
            let seats = head + other.head_seat.outer_radius;
            miss = miss.max(self.pitch.max(seats) - apart(at, place));
        }
        if miss <= SLACK { 0.0 } else { miss }
    }

    /// By how much two places stand too near, m; 0 where they do not.
    pub fn pair_miss(&self, one: [f64; 2], other: [f64; 2]) -> f64 {
        let seat = self.fastener.head_seat.outer_radius;
        let nut = self.fastener.nut_seat.map_or(0.0, |nut| nut.outer_radius);
        let miss = self.pitch.max(2.0 * seat.max(nut)) - apart(one, other);
        if miss <= SLACK { 0.0 } else { miss }
    }

    /// By how much a layout misses all its distances together, m; 0 where it keeps them.
    pub fn miss(&self, places: &[[f64; 2]]) -> f64 {
        let mut miss = 0.0;
        for (index, place) in places.iter().enumerate() {
            miss += self.place_miss(*place);
            for other in &places[..index] {
                miss += self.pair_miss(*place, *other);
            }
        }
        miss
    }

    /// The bolts of the other groups, which stay.
    fn others(&self) -> impl Iterator<Item = (&Fastener, [f64; 2])> {
        let groups = self.joint.fasteners.iter().enumerate();
        let others = groups.filter(|(index, _)| *index != self.group);
        others.flat_map(|(_, group)| group.places.iter().map(move |at| (group, *at)))
    }
}

fn apart(one: [f64; 2], other: [f64; 2]) -> f64 {
    (one[0] - other[0]).hypot(one[1] - other[1])
}

/// Distance of a place from a zone, m; below zero inside.
pub(super) fn distance(zone: Zone, place: [f64; 2]) -> f64 {
    match zone {
        Zone::Face => f64::NEG_INFINITY,
        Zone::Disc { centre, radius } => apart(centre, place) - radius,
        Zone::Rectangle { centre, size } => {
            let [x, y] = [0, 1].map(|k| (place[k] - centre[k]).abs() - 0.5 * size[k]);
            if x.max(y) <= 0.0 {
                x.max(y)
            } else {
                x.max(0.0).hypot(y.max(0.0))
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn distances_from_zones_are_those_to_their_nearest_point() {
        let zone = Zone::Rectangle {
            centre: [1.0, 1.0],
            size: [2.0, 1.0],
        };
        for (place, expected) in [([5.0, 5.5], 5.0), ([1.0, 2.0], 0.5), ([1.0, 1.0], -0.5)] {
            assert!((distance(zone, place) - expected).abs() < 1e-12);
        }
    }
}
