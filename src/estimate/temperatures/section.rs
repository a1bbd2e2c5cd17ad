//! A section through the stack along a row of bolts, and what lies on it.

mod line;
mod outline;

use crate::{
    estimate::{Chain, Failure, Realisation},
    joint::{Joint, Plate},
    resistance::columns::{Across, Section},
};

pub use outline::{OutlinePlate, StackOutline, stack_outline};

use line::{chords, heated, places, point, row};

/// Most nodes through a plate that is one element: its polynomial passes through them.
const ONE_ELEMENT: usize = 4;

/// The stack cut along a row of bolts, the warm plate on top.
#[derive(Clone, Debug, PartialEq)]
pub struct StackSection {
    /// The line of the cut.
    pub across: Across,
    /// The plates, warm side first.
    pub plates: Vec<SectionPlate>,
    /// The bolts that the cut meets, in order along it.
    pub bolts: Vec<SectionBolt>,
    /// Where the cut meets heated zones, m.
    pub heated: Vec<[f64; 2]>,
    /// Where the faces touch, m along the cut.
    pub touching: Vec<[f64; 2]>,
    /// Temperatures through all plates at chosen places.
    pub through: Vec<Through>,
}

/// One plate on the section.
#[derive(Clone, Debug, PartialEq)]
pub struct SectionPlate {
    /// Its name.
    pub name: String,
    /// What is solid, cut-outs and bolt holes left out.
    pub solid: Vec<Solid>,
    /// Temperatures at grid lines, per watt above the mean sink surface.
    pub section: Section,
}

/// A part of a plate on the section.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Solid {
    /// From where to where along the cut, m.
    pub along: [f64; 2],
    /// Heights above the lowest face of the stack, m.
    pub heights: [f64; 2],
}

/// A bolt on the section.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SectionBolt {
    /// Its number in the joint, from 1.
    pub number: usize,
    /// Place of its axis along the cut, m.
    pub along: f64,
    /// Outer radius under its head, m.
    pub head_radius: f64,
    /// Radius of its widest hole, m.
    pub hole_radius: f64,
}

/// Temperatures through all plates at one place.
#[derive(Clone, Debug, PartialEq)]
pub struct Through {
    /// What the place is: `beside bolt 1`.
    pub name: String,
    /// Where it is along the cut, m.
    pub along: f64,
    /// Height above the lowest face of the stack, m, and temperature per watt, K/W, of every
    /// plate, warm side first, from its lower face upwards.
    pub plates: Vec<Vec<[f64; 2]>>,
}

impl SectionPlate {
    /// Temperature at a place of the section, K/W; none where the plate is not solid.
    pub fn rise_at(&self, [along, height]: [f64; 2]) -> Option<f64> {
        let holds = |[low, high]: [f64; 2], at: f64| low <= at && at <= high;
        let solid = self
            .solid
            .iter()
            .any(|part| holds(part.along, along) && holds(part.heights, height));
        let heights = &self.section.heights;
        let last = heights.len().checked_sub(1).filter(|_| solid)?;
        let node = heights[1..last.max(1)].partition_point(|line| *line <= height);
        let ends = [node, (node + 1).min(last)].map(|node| self.node_at(node, along));
        let span = heights[(node + 1).min(last)] - heights[node];
        let share = if span > 0.0 {
            (height - heights[node]) / span
        } else {
            0.0
        };
        match ends {
            [Some(below), Some(above)] => Some(below + share * (above - below)),
            [below, above] => below.or(above),
        }
    }

    /// Temperature of a node at a place: between the lines where both have one, else that of the
    /// nearest that has.
    fn node_at(&self, node: usize, along: f64) -> Option<f64> {
        let lines = &self.section.along;
        let right = lines.partition_point(|line| *line < along);
        let value = |line: usize| self.section.rise.get(line)?.get(node).copied().flatten();
        let below = (0..right).rev().find_map(|line| Some((line, value(line)?)));
        let above = (right..lines.len()).find_map(|line| Some((line, value(line)?)));
        let (Some((left, low)), Some((next, high))) = (below, above) else {
            return below.or(above).map(|(_, value)| value);
        };
        if next == left + 1 {
            let share = (along - lines[left]) / (lines[next] - lines[left]);
            Some(low + share * (high - low))
        } else if along - lines[left] < lines[next] - along {
            Some(low)
        } else {
            Some(high)
        }
    }

    /// Heights and temperatures at a place, upwards; empty where the plate is not solid.
    fn through(&self, along: f64) -> Vec<[f64; 2]> {
        let heights = self.section.heights.iter();
        let points = heights.filter_map(|height| Some([*height, self.rise_at([along, *height])?]));
        let nodes: Vec<[f64; 2]> = points.collect();
        if nodes.len() == self.section.heights.len() && nodes.len() <= ONE_ELEMENT {
            curve(&nodes)
        } else {
            nodes
        }
    }
}

/// The polynomial through the nodes of one element, as points.
fn curve(nodes: &[[f64; 2]]) -> Vec<[f64; 2]> {
    const PARTS: usize = 24;
    let (Some(first), Some(last)) = (nodes.first(), nodes.last()) else {
        return Vec::new();
    };
    let at = |height: f64| -> f64 {
        let terms = nodes.iter().enumerate().map(|(index, [own, value])| {
            let others = nodes
                .iter()
                .enumerate()
                .filter(|(other, _)| *other != index);
            let shape = others.map(|(_, [node, _])| (height - node) / (own - node));
            value * shape.product::<f64>()
        });
        terms.sum()
    };
    (0..=PARTS)
        .map(|part| {
            let share = part as f64 / PARTS as f64;
            let height = first[0] + share * (last[0] - first[0]);
            [height, at(height)]
        })
        .collect()
}

/// The section along the row of most bolts in the first case at nominal; none for the cone.
pub fn stack_section(chain: &Chain) -> Result<Option<StackSection>, Failure> {
    let joint = chain.joint();
    let Some((across, bolts)) = row(joint) else {
        return Ok(None);
    };
    let Some(sections) = chain.section(across)? else {
        return Ok(None);
    };
    let state = chain.state(0, &Realisation::default())?;
    let plates: Vec<SectionPlate> = joint
        .plates
        .iter()
        .zip(sections)
        .enumerate()
        .map(|(index, (plate, section))| SectionPlate {
            name: plate.name.clone(),
            solid: extent(&section).map_or_else(Vec::new, |[range, heights]| {
                solid(joint, (index, plate), (across, range, heights))
            }),
            section,
        })
        .collect();
    let ends = overlap(&plates);
    let through = places(&bolts, ends)
        .into_iter()
        .map(|(name, along)| Through {
            plates: plates.iter().map(|plate| plate.through(along)).collect(),
            name,
            along,
        })
        .filter(|through| through.plates.iter().all(|points| points.len() > 1))
        .collect();
    let range = plates.iter().find_map(|plate| {
        let along = &plate.section.along;
        Some([*along.first()?, *along.last()?])
    });
    Ok(range.map(|range| StackSection {
        touching: chords(range, |along| {
            let met = chain.met_at(point(across, along), &state);
            met.is_some_and(|met| met.pressure > 0.0)
        }),
        heated: joint
            .source
            .zones()
            .into_iter()
            .filter_map(|(zone, _)| heated(zone, (across, range)))
            .collect(),
        across,
        plates,
        bolts,
        through,
    }))
}

/// From where to where a section reaches along the cut, and in height, m.
fn extent(section: &Section) -> Option<[[f64; 2]; 2]> {
    let ends = |lines: &[f64]| Some([*lines.first()?, *lines.last()?]);
    Some([ends(&section.along)?, ends(&section.heights)?])
}

/// What is solid of a plate between two heights: itself, its feet towards the other, its ribs away
/// from it; looked for along a range of the cut.
fn solid(
    joint: &Joint,
    (index, plate): (usize, &Plate),
    (across, [from, to], [foot, top]): (Across, [f64; 2], [f64; 2]),
) -> Vec<Solid> {
    let count = joint.plates.len();
    let own = |along: f64| plate.own(point(across, along));
    let open = |along: f64| {
        let at = point(across, along);
        joint.bolts().any(|(fastener, [x, y])| {
            let holes = &fastener.hole_radius;
            let hole = holes.get(index).or(holes.last()).copied().unwrap_or(0.0);
            (at[0] - x).hypot(at[1] - y) < hole
        })
    };
    let mut found = Vec::new();
    let mut part = |heights: [f64; 2], inside: &dyn Fn(f64) -> bool| {
        let covered =
            |along: f64| plate.covers(point(across, along)) && inside(along) && !open(along);
        let spans = chords([from, to], covered);
        found.extend(spans.into_iter().map(|along| Solid { along, heights }));
    };
    let feet = plate.feet.as_ref().map_or(0.0, |feet| feet.height);
    // The last plate faces upwards, all others down.
    let faces_down = index + 1 < count;
    let main = if faces_down {
        [foot + feet, foot + feet + plate.thickness]
    } else {
        [top - feet - plate.thickness, top - feet]
    };
    part(main, &|_| true);
    if let Some(feet) = &plate.feet {
        let heights = if faces_down {
            [foot, main[0]]
        } else {
            [main[1], top]
        };
        part(heights, &|along| {
            feet.at.iter().any(|foot| foot.contains(own(along)))
        });
    }
    for rib in &plate.ribs {
        let heights = if faces_down {
            [main[1], main[1] + rib.height]
        } else {
            [main[0] - rib.height, main[0]]
        };
        part(heights, &|along| rib.patch.contains(own(along)));
    }
    found
}

/// The part of the line where every plate is, holes bridged, m.
fn overlap(plates: &[SectionPlate]) -> [f64; 2] {
    let mut ends = [f64::NEG_INFINITY, f64::INFINITY];
    for plate in plates {
        let parts = plate.solid.iter().map(|part| part.along);
        let [from, to] = parts.fold([f64::INFINITY, f64::NEG_INFINITY], |ends, part| {
            [ends[0].min(part[0]), ends[1].max(part[1])]
        });
        ends = [ends[0].max(from), ends[1].min(to)];
    }
    ends
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_plate_takes_the_nearest_temperature_beside_a_hole() {
        let plate = SectionPlate {
            name: String::new(),
            solid: vec![Solid {
                along: [0.0, 4.0],
                heights: [0.0, 1.0],
            }],
            section: Section {
                along: vec![0.0, 1.0, 2.0, 3.0, 4.0],
                heights: vec![0.0, 1.0],
                rise: vec![
                    vec![Some(0.0), Some(2.0)],
                    vec![Some(1.0), Some(3.0)],
                    vec![None, None],
                    vec![Some(9.0), Some(11.0)],
                    vec![Some(9.0), Some(11.0)],
                ],
            },
        };
        assert_eq!(plate.rise_at([0.5, 0.5]), Some(1.5));
        assert_eq!(plate.rise_at([1.5, 0.5]), Some(2.0));
        assert_eq!(plate.rise_at([2.5, 0.5]), Some(10.0));
        assert_eq!(plate.rise_at([5.0, 0.5]), None);
        let through = plate.through(0.0);
        assert_eq!(through.first(), Some(&[0.0, 0.0]));
        assert_eq!(through.last(), Some(&[1.0, 2.0]));
    }
}
