//! The bolts that matter to one bolt, found from the nearest outward.

use std::{cmp::Ordering, collections::BinaryHeap};

use crate::resistance::{
    cells::Plan,
    region::{Region, Side},
};

/// Who stands around a bolt.
pub(super) struct Neighbours {
    /// Bolts that bound its cell, reach into it or press on it, the nearest first: index and place
    /// seen from the bolt.
    pub(super) others: Vec<(usize, [f64; 2])>,
    /// The sides that part it from the others.
    pub(super) nearer: Vec<Side>,
}

/// A bolt by its distance; the nearest is the greatest, so that a heap gives it first.
#[derive(Clone, Copy, Debug)]
struct Other {
    distance: f64,
    index: usize,
    to: [f64; 2],
}

impl Ord for Other {
    fn cmp(&self, other: &Self) -> Ordering {
        (other.distance.total_cmp(&self.distance)).then(other.index.cmp(&self.index))
    }
}

impl PartialOrd for Other {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

impl PartialEq for Other {
    fn eq(&self, other: &Self) -> bool {
        self.cmp(other) == Ordering::Equal
    }
}

impl Eq for Other {}

/// The neighbours of a bolt on two plates whose sides are seen from it.
///
/// A bolt farther away than twice the farthest point of the region bounds nothing; of those beyond,
/// only the ones count whose hole or contact still reaches the region.
pub(super) fn neighbours(plan: &Plan, bolt: usize, plates: &[Vec<Side>; 2]) -> Neighbours {
    let axis = plan.sites[bolt].at;
    let (mut reach, mut hole): (f64, f64) = (0.0, 0.0);
    let others: Vec<Other> = plan
        .sites
        .iter()
        .enumerate()
        .filter(|(other, _)| *other != bolt)
        .map(|(index, site)| {
            reach = reach.max(site.cone.contact_radius);
            hole = hole.max(plan.hole_radius(index));
            let to = [site.at[0] - axis[0], site.at[1] - axis[1]];
            Other {
                distance: to[0].hypot(to[1]),
                index,
                to,
            }
        })
        .collect();
    let mut waiting = BinaryHeap::from(others);
    let mut found = Neighbours {
        others: Vec::new(),
        nearer: Vec::new(),
    };
    let mut far = farthest(plates, &found.nearer);
    while let Some(other) = waiting.pop() {
        let bounds = other.distance < 2.0 * far;
        if !bounds && other.distance > (far + reach).max(2.0 * hole) {
            break;
        }
        found.others.push((other.index, other.to));
        if bounds {
            found.nearer.push(Side::Line {
                normal: other.to.map(|to| to / other.distance),
                offset: 0.5 * other.distance,
            });
            far = farthest(plates, &found.nearer);
        }
    }
    found
}

/// Distance of the farthest point of a region on either plate, m.
fn farthest(plates: &[Vec<Side>; 2], nearer: &[Side]) -> f64 {
    plates
        .iter()
        .map(|plate| Region::new(&[nearer, plate].concat()).farthest())
        .fold(0.0, f64::max)
}

#[cfg(test)]
mod tests {
    use crate::resistance::fixtures::lattice;

    #[test]
    fn a_bolt_of_a_lattice_knows_only_those_around_it() {
        let plan = lattice(9, 0.03);
        let view = plan.view(40);
        // Four bound its cell and four touch its corners, or miss them by rounding; contacts of the
        // second row end before it.
        assert!((4..=8).contains(&view.others.len()), "{:?}", view.others);
        let area = view.plates[0].region.area_within(f64::INFINITY);
        assert!((area / (0.03 * 0.03) - 1.0).abs() < 1e-12);
    }

    // On a lattice of 3 by 4 the corners of a cell lie 2.5 from its bolt and the bolts across them 5, in
    // whole numbers: these touch the cell in a point and bound nothing.
    #[test]
    fn a_bolt_across_a_corner_is_no_neighbour() {
        let mut plan = lattice(3, 4.0);
        for site in &mut plan.sites {
            site.at[0] *= 0.75;
        }
        let mut known: Vec<usize> = plan.view(4).others.iter().map(|(bolt, _)| *bolt).collect();
        known.sort_unstable();
        assert_eq!(known, [1, 3, 5, 7]);
    }
}
