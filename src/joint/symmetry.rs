//! Bolts that stand alike: a turn or a reflection of the whole joint puts one in the place of another.

use crate::joint::{CooledPart, Cooling, Joint, Outline, Plate, Zone};

/// Places nearer than this share of the first plate are the same.
const SAME: f64 = 1e-6;

/// A turn or a reflection about a centre.
#[derive(Clone, Copy, Debug)]
struct Motion([[f64; 2]; 2]);

/// Turns and reflections that a rectangle or a square can have.
const SQUARE: [Motion; 7] = [
    Motion([[-1.0, 0.0], [0.0, 1.0]]),
    Motion([[1.0, 0.0], [0.0, -1.0]]),
    Motion([[-1.0, 0.0], [0.0, -1.0]]),
    Motion([[0.0, 1.0], [1.0, 0.0]]),
    Motion([[0.0, -1.0], [-1.0, 0.0]]),
    Motion([[0.0, -1.0], [1.0, 0.0]]),
    Motion([[0.0, 1.0], [-1.0, 0.0]]),
];

impl Joint {
    /// Bolts by their likes, counted from 0: each bolt is in one list, with every bolt whose place it
    /// takes when the joint is turned or reflected onto itself.
    ///
    /// Parts of plates, maps, sag and single edges are not looked into: with one of these each bolt
    /// counts for itself, which costs time and is never wrong.
    /// Checked: `bolts_of_a_symmetric_joint_are_alike`, `a_heated_zone_off_the_centre_parts_them`.
    pub fn like_bolts(&self) -> Vec<Vec<usize>> {
        let count = self.bolts().count();
        let mut first: Vec<usize> = (0..count).collect();
        for motion in self.motions() {
            if let Some(moved) = self.moved(motion) {
                for (bolt, to) in moved.into_iter().enumerate() {
                    let (one, other) = (first[bolt], first[to]);
                    let least = one.min(other);
                    for known in &mut first {
                        if *known == one || *known == other {
                            *known = least;
                        }
                    }
                }
            }
        }
        (0..count)
            .filter(|bolt| first[*bolt] == *bolt)
            .map(|bolt| (0..count).filter(|each| first[*each] == bolt).collect())
            .collect()
    }

    fn motions(&self) -> Vec<Motion> {
        let mut found = SQUARE.to_vec();
        if matches!(self.warm().outline, Outline::Disc { .. }) {
            for group in &self.fasteners {
                let turn = std::f64::consts::TAU / group.places.len() as f64;
                let (sine, cosine) = turn.sin_cos();
                found.push(Motion([[cosine, -sine], [sine, cosine]]));
            }
        }
        found
    }

    /// Where each bolt goes when the joint is moved onto itself; none where it is not the same.
    fn moved(&self, motion: Motion) -> Option<Vec<usize>> {
        let centre = middle(self.warm())?;
        let [left, lower, right, upper] = self.warm().bounds();
        let near = SAME * (right - left).hypot(upper - lower);
        let same = |a: [f64; 2], b: [f64; 2]| (a[0] - b[0]).hypot(a[1] - b[1]) <= near;
        let plain = |plate: &Plate| {
            plate.cutouts.is_empty()
                && plate.feet.is_none()
                && plate.ribs.is_empty()
                && plate.flatness_map.is_none()
                && plate.sag.is_none()
                && middle(plate).is_some_and(|own| same(own, centre))
                && motion.keeps(&plate.outline, near)
        };
        let ends = self.warm_zones().into_iter().chain([self.cold_zones()?]);
        let kept = self.plates.iter().all(plain)
            && self.missing.is_empty()
            && ends
                .into_iter()
                .all(|zones| motion.keeps_zones((centre, near), &zones));
        if !kept {
            return None;
        }
        let mut to = Vec::new();
        for group in &self.fasteners {
            let before = to.len();
            for place in &group.places {
                let there = motion.of(centre, *place);
                let found = group.places.iter().position(|other| same(*other, there));
                to.push(before + found?);
            }
        }
        Some(to)
    }

    /// Heated zones, each with its heat, in joint coordinates.
    fn warm_zones(&self) -> Vec<Vec<(Zone, f64)>> {
        vec![self.source.zones()]
    }

    /// Cooled zones likewise; none where an edge alone is cooled.
    fn cold_zones(&self) -> Option<Vec<(Zone, f64)>> {
        let Cooling::Parts(parts) = &self.sink else {
            return Some(Vec::new());
        };
        let origin = self.cold().origin;
        parts
            .iter()
            .map(|part| match part {
                CooledPart::Film { zone, coefficient } => Some((zone.moved(origin), *coefficient)),
                CooledPart::Held(zone) => Some((zone.moved(origin), f64::INFINITY)),
                CooledPart::Rim | CooledPart::Radiation { .. } => Some((Zone::Face, 0.0)),
                CooledPart::Edge(_) => None,
            })
            .collect()
    }
}

impl Motion {
    fn of(self, centre: [f64; 2], point: [f64; 2]) -> [f64; 2] {
        let from = [0, 1].map(|k| point[k] - centre[k]);
        let Self(rows) = self;
        [0, 1].map(|k| centre[k] + rows[k][0] * from[0] + rows[k][1] * from[1])
    }

    /// A size after the motion; none for a turn that sets a rectangle askew.
    fn size(self, [wide, tall]: [f64; 2]) -> Option<[f64; 2]> {
        let Self([[a, b], _]) = self;
        if b.abs() < SAME {
            Some([wide, tall])
        } else if a.abs() < SAME {
            Some([tall, wide])
        } else {
            None
        }
    }

    fn keeps(self, outline: &Outline, near: f64) -> bool {
        match outline {
            Outline::Rectangle { size } => self
                .size(*size)
                .is_some_and(|turned| (turned[0] - size[0]).abs() <= near),
            Outline::Disc { .. } => true,
            Outline::Polygon { .. } => false,
        }
    }

    fn keeps_zones(self, (centre, near): ([f64; 2], f64), zones: &[(Zone, f64)]) -> bool {
        let there = |zone: &Zone| match *zone {
            Zone::Face => Some(Zone::Face),
            Zone::Rectangle { centre: at, size } => Some(Zone::Rectangle {
                centre: self.of(centre, at),
                size: self.size(size)?,
            }),
            Zone::Disc { centre: at, radius } => Some(Zone::Disc {
                centre: self.of(centre, at),
                radius,
            }),
        };
        zones.iter().all(|(zone, strength)| {
            there(zone).is_some_and(|moved| {
                zones.iter().any(|(other, of_other)| {
                    alike(&moved, other, near) && strength.to_bits() == of_other.to_bits()
                })
            })
        })
    }
}

fn alike(one: &Zone, other: &Zone, near: f64) -> bool {
    let same = |a: [f64; 2], b: [f64; 2]| (a[0] - b[0]).hypot(a[1] - b[1]) <= near;
    match (*one, *other) {
        (Zone::Face, Zone::Face) => true,
        (
            Zone::Rectangle { centre, size },
            Zone::Rectangle {
                centre: at,
                size: own,
            },
        ) => same(centre, at) && same(size, own),
        (
            Zone::Disc { centre, radius },
            Zone::Disc {
                centre: at,
                radius: own,
            },
        ) => same(centre, at) && (radius - own).abs() <= near,
        _ => false,
    }
}

/// Middle of a plate in joint coordinates, m; none of a polygon.
fn middle(plate: &Plate) -> Option<[f64; 2]> {
    match plate.outline {
        Outline::Rectangle { size } => Some([0, 1].map(|k| plate.origin[k] + 0.5 * size[k])),
        Outline::Disc { .. } => Some(plate.origin),
        Outline::Polygon { .. } => None,
    }
}

#[cfg(test)]
mod tests {
    use crate::joint::{Source, Zone, fixture};

    #[test]
    fn bolts_of_a_symmetric_joint_are_alike() {
        let mut joint = fixture::joint();
        // Two bolts on the diagonal of 80 by 60 mm: half a turn changes them.
        assert_eq!(joint.like_bolts(), [vec![0, 1]]);
        // Six in two rows: corners are alike, and so are the two in the middle.
        joint.fasteners[0].places = [[10, 10], [40, 10], [70, 10], [10, 50], [40, 50], [70, 50]]
            .map(|place| place.map(|mm| 1e-3 * f64::from(mm)))
            .to_vec();
        assert_eq!(joint.like_bolts(), [vec![0, 2, 3, 5], vec![1, 4]]);
    }

    #[test]
    fn a_heated_zone_off_the_centre_parts_them() {
        let mut joint = fixture::joint();
        joint.source = Source {
            zone: Zone::Disc {
                centre: [0.03, 0.03],
                radius: 5e-3,
            },
            isothermal: false,
        }
        .into();
        assert_eq!(joint.like_bolts(), [vec![0], vec![1]]);
        joint.source = Source {
            zone: Zone::Disc {
                centre: [0.04, 0.03],
                radius: 5e-3,
            },
            isothermal: false,
        }
        .into();
        assert_eq!(joint.like_bolts(), [vec![0, 1]]);
    }
}
