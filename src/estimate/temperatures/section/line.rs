//! The line of a cut: which one it is, what it meets, which places on it are worth a profile.

use crate::{
    estimate::temperatures::section::SectionBolt,
    joint::{Fastener, Joint, Zone},
    resistance::columns::Across,
};

/// Samples along a line that find where something begins and ends; bisection does the rest.
const SAMPLES: usize = 2000;

/// A point on the line, in joint coordinates.
pub(super) fn point(across: Across, along: f64) -> [f64; 2] {
    match across {
        Across::X(y) => [along, y],
        Across::Y(x) => [x, along],
    }
}

/// The line that meets most bolts, and these in order; of equal ones along x, the first in the file.
pub(super) fn row(joint: &Joint) -> Option<(Across, Vec<SectionBolt>)> {
    let bolts: Vec<(&Fastener, [f64; 2])> = joint.bolts().collect();
    let met = |[along, off]: [usize; 2], line: f64| -> Vec<SectionBolt> {
        let mut met: Vec<SectionBolt> = bolts
            .iter()
            .enumerate()
            .filter_map(|(index, (fastener, at))| {
                let hole = widest(fastener);
                // Nearer to the axis than half way to the wall.
                ((at[off] - line).abs() < 0.5 * hole).then_some(SectionBolt {
                    number: index + 1,
                    along: at[along],
                    head_radius: fastener.head_seat.outer_radius,
                    hole_radius: hole,
                })
            })
            .collect();
        met.sort_by(|one, other| one.along.total_cmp(&other.along));
        met
    };
    let lines = bolts.iter().flat_map(|(_, [x, y])| {
        [
            (Across::X(*y), met([0, 1], *y)),
            (Across::Y(*x), met([1, 0], *x)),
        ]
    });
    let mut best: Option<(Across, Vec<SectionBolt>)> = None;
    for (across, met) in lines {
        if best.as_ref().is_none_or(|(_, most)| met.len() > most.len()) {
            best = Some((across, met));
        }
    }
    best
}

fn widest(fastener: &Fastener) -> f64 {
    fastener.hole_radius.iter().copied().fold(0.0, f64::max)
}

/// Where something holds on a line, to a millionth of its length.
pub(super) fn chords([from, to]: [f64; 2], inside: impl Fn(f64) -> bool) -> Vec<[f64; 2]> {
    let step = (to - from) / SAMPLES as f64;
    let edge = |mut outside: f64, mut within: f64| {
        for _ in 0..20 {
            let middle = f64::midpoint(outside, within);
            if inside(middle) {
                within = middle;
            } else {
                outside = middle;
            }
        }
        within
    };
    let mut chords: Vec<[f64; 2]> = Vec::new();
    let mut before: Option<f64> = None;
    // Samples stand in the middle of their steps, so that none falls on an edge of the plan.
    let samples = (0..SAMPLES).map(|sample| from + (sample as f64 + 0.5) * step);
    for at in samples {
        match (before, inside(at)) {
            (None, true) => {
                let start = if at - step < from && inside(from) {
                    from
                } else {
                    edge((at - step).max(from), at)
                };
                chords.push([start, at]);
                before = Some(at);
            }
            (Some(last), false) => {
                if let Some(chord) = chords.last_mut() {
                    chord[1] = edge(at, last);
                }
                before = None;
            }
            (Some(_), true) => before = Some(at),
            (None, false) => {}
        }
    }
    if let (Some(last), Some(chord)) = (before, chords.last_mut()) {
        chord[1] = if inside(to) { to } else { edge(to, last) };
    }
    chords
}

/// Places worth a profile: beside a bolt, and half way to its neighbour; beside a lone bolt half
/// way from its head to the farther edge.
pub(super) fn places(bolts: &[SectionBolt], [from, to]: [f64; 2]) -> Vec<(String, f64)> {
    let beside = |bolt: &SectionBolt, towards: f64| {
        // Clear of the wall of the hole, and still under the head.
        let reach = 0.25 * bolt.hole_radius + 0.75 * bolt.head_radius;
        let side = (towards - bolt.along).signum();
        (
            format!("beside bolt {}", bolt.number),
            bolt.along + side * reach,
        )
    };
    let middle = f64::midpoint(from, to);
    let pair = bolts
        .windows(2)
        .map(|pair| (pair, f64::midpoint(pair[0].along, pair[1].along)))
        .min_by(|(_, one), (_, other)| (one - middle).abs().total_cmp(&(other - middle).abs()));
    if let Some((pair, half_way)) = pair {
        let name = format!("between bolts {} and {}", pair[0].number, pair[1].number);
        return vec![beside(&pair[0], half_way), (name, half_way)];
    }
    let Some(bolt) = bolts.first() else {
        return Vec::new();
    };
    let [towards, side] = if to - bolt.along >= bolt.along - from {
        [to, 1.0]
    } else {
        [from, -1.0]
    };
    let away = f64::midpoint(bolt.along + side * bolt.head_radius, towards);
    vec![
        beside(bolt, towards),
        ("away from the bolt".to_owned(), away),
    ]
}

/// Where a line meets a heated zone.
pub(super) fn heated(zone: Zone, (across, [from, to]): (Across, [f64; 2])) -> Option<[f64; 2]> {
    let inside = |along: f64| {
        let [x, y] = point(across, along);
        match zone {
            Zone::Face => true,
            Zone::Rectangle { centre, size } => {
                (x - centre[0]).abs() <= 0.5 * size[0] && (y - centre[1]).abs() <= 0.5 * size[1]
            }
            Zone::Disc { centre, radius } => (x - centre[0]).hypot(y - centre[1]) <= radius,
        }
    };
    match zone {
        Zone::Face => None,
        _ => chords([from, to], inside).first().copied(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn chords_find_edges_and_the_ends_of_the_line() {
        let found = chords([0.0, 1.0], |at| {
            at < 0.25 || (0.5..=0.75).contains(&at) || at > 0.9
        });
        let known = [[0.0, 0.25], [0.5, 0.75], [0.9, 1.0]];
        assert_eq!(found.len(), known.len());
        for (one, other) in found.iter().flatten().zip(known.iter().flatten()) {
            // Twenty halvings of a step of 1/2000 of the line.
            assert!((one - other).abs() < 1e-9, "{found:?}");
        }
    }

    #[test]
    fn a_place_between_bolts_lies_half_way_and_one_beside_them_under_the_head() {
        let bolt = |number: usize, along: f64| SectionBolt {
            number,
            along,
            head_radius: 4.0,
            hole_radius: 2.0,
        };
        let found = places(
            &[bolt(1, 10.0), bolt(4, 50.0), bolt(2, 100.0)],
            [0.0, 100.0],
        );
        assert_eq!(found[0].0, "beside bolt 1");
        assert!((12.0..=14.0).contains(&found[0].1));
        assert_eq!(found[1], ("between bolts 1 and 4".to_owned(), 30.0));
        let lone = places(&[bolt(1, 70.0)], [0.0, 100.0]);
        assert_eq!(lone[1], ("away from the bolt".to_owned(), 33.0));
    }
}
