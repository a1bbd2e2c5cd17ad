//! Free places on a lattice: every layout where they are few, exchange from several starts else.

use crate::joint::Family;
use crate::layout::{
    Constraints, Layout,
    patterns::Orbit,
    search::{Bank, Search},
};

/// So many layouts are all tried.
const ALL: u64 = 20_000;
/// Random starts of the exchange beside the greedy one.
const STARTS: u64 = 3;
/// Rounds of the exchange; each moves one orbit at most, and a dozen suffice.
const ROUNDS: usize = 60;

/// Places for so many bolts of one size.
#[derive(Clone, Copy, Debug)]
pub(super) struct Unit<'a> {
    pub(super) size: usize,
    pub(super) bolts: usize,
    pub(super) orbits: &'a [Orbit],
}

/// Judges layouts made of orbits.
struct Judge<'a> {
    unit: Unit<'a>,
    search: &'a Search<'a>,
    constraints: Constraints<'a>,
    bank: &'a Bank<'a>,
}

impl Judge<'_> {
    fn places(&self, chosen: &[usize]) -> Vec<[f64; 2]> {
        let orbits = chosen.iter().flat_map(|orbit| &self.unit.orbits[*orbit]);
        orbits.copied().collect()
    }

    fn count(&self, chosen: &[usize]) -> usize {
        let orbits = chosen.iter().map(|orbit| self.unit.orbits[*orbit].len());
        orbits.sum()
    }

    fn fits(&self, chosen: &[usize], orbit: usize) -> bool {
        let near = |one: &[f64; 2]| {
            let others = chosen.iter().flat_map(|other| &self.unit.orbits[*other]);
            others
                .into_iter()
                .any(|other| self.constraints.pair_miss(*one, *other) > 0.0)
        };
        !chosen.contains(&orbit) && !self.unit.orbits[orbit].iter().any(near)
    }

    /// What ranks a layout, smaller being better.
    fn rank(&self, chosen: &[usize]) -> f64 {
        let places = self.places(chosen);
        let value = self.search.value(self.bank, (self.unit.size, &places));
        self.search.target.rank(value)
    }

    fn layout(&self, chosen: &[usize]) -> Layout {
        let places = self.places(chosen);
        Layout {
            size: self.unit.size,
            family: Family::Free,
            refined: false,
            value: self.search.value(self.bank, (self.unit.size, &places)),
            places,
        }
    }
}

/// The best layouts of a unit, best first.
pub(super) fn best(search: &Search, bank: &Bank, unit: Unit) -> Vec<Layout> {
    let judge = Judge {
        unit,
        search,
        constraints: search.constraints(unit.size),
        bank,
    };
    let chosen = if ways(unit) <= ALL {
        all(&judge)
    } else {
        let greedy = greedy(&judge, Vec::new());
        let random = (0..STARTS).map(|start| random(&judge, start));
        std::iter::once(greedy)
            .chain(random)
            .flatten()
            .map(|start| exchanged(&judge, start))
            .collect()
    };
    let mut layouts: Vec<Layout> = chosen.iter().map(|each| judge.layout(each)).collect();
    search.sort(&mut layouts);
    layouts.dedup_by(|one, other| one.places == other.places);
    layouts.truncate(super::search::KEPT);
    layouts
}

/// Number of sets of orbits with so many places, pitch not looked at.
fn ways(unit: Unit) -> u64 {
    let mut ways = vec![0_u64; unit.bolts + 1];
    ways[0] = 1;
    for orbit in unit.orbits {
        for count in (orbit.len()..=unit.bolts).rev() {
            ways[count] = ways[count].saturating_add(ways[count - orbit.len()]);
        }
    }
    ways[unit.bolts]
}

/// The best of all layouts.
fn all(judge: &Judge) -> Vec<Vec<usize>> {
    let mut best: Vec<(f64, Vec<usize>)> = Vec::new();
    let mut open: Vec<Vec<usize>> = vec![Vec::new()];
    while let Some(chosen) = open.pop() {
        let count = judge.count(&chosen);
        if count == judge.unit.bolts {
            best.push((judge.rank(&chosen), chosen));
            best.sort_by(|one, other| one.0.total_cmp(&other.0).then(one.1.cmp(&other.1)));
            best.truncate(super::search::KEPT);
            continue;
        }
        let first = chosen.last().map_or(0, |last| last + 1);
        for orbit in first..judge.unit.orbits.len() {
            let room = judge.unit.bolts - count;
            if judge.unit.orbits[orbit].len() <= room && judge.fits(&chosen, orbit) {
                let mut longer = chosen.clone();
                longer.push(orbit);
                open.push(longer);
            }
        }
    }
    best.into_iter().map(|(_, chosen)| chosen).collect()
}

/// Adds the orbit that helps most until all bolts stand; none where they do not fit.
fn greedy(judge: &Judge, mut chosen: Vec<usize>) -> Option<Vec<usize>> {
    loop {
        let room = judge.unit.bolts - judge.count(&chosen);
        if room == 0 {
            return Some(chosen);
        }
        let mut best: Option<(f64, usize)> = None;
        for (orbit, places) in judge.unit.orbits.iter().enumerate() {
            if places.len() > room || !judge.fits(&chosen, orbit) {
                continue;
            }
            chosen.push(orbit);
            let rank = judge.rank(&chosen);
            chosen.pop();
            if best.is_none_or(|(least, _)| rank < least) {
                best = Some((rank, orbit));
            }
        }
        chosen.push(best?.1);
    }
}

/// A layout drawn at random; none where what was drawn leaves no room for the rest.
fn random(judge: &Judge, start: u64) -> Option<Vec<usize>> {
    let unit = judge.unit;
    let stream = (unit.size as u64) << 40 | (unit.bolts as u64) << 20 | start;
    let mut state = judge.search.task.seed ^ stream.wrapping_mul(0x9e37_79b9_7f4a_7c15);
    let mut order: Vec<(u64, usize)> = (0..unit.orbits.len())
        .map(|orbit| (split_mix(&mut state), orbit))
        .collect();
    order.sort_unstable();
    let mut chosen = Vec::new();
    for (_, orbit) in order {
        let room = unit.bolts - judge.count(&chosen);
        if unit.orbits[orbit].len() <= room && judge.fits(&chosen, orbit) {
            chosen.push(orbit);
        }
    }
    (judge.count(&chosen) == unit.bolts).then_some(chosen)
}

/// The next number of `SplitMix64` (Steele, Lea and Flood 2014, constants from memory).
fn split_mix(state: &mut u64) -> u64 {
    *state = state.wrapping_add(0x9e37_79b9_7f4a_7c15);
    let mut z = *state;
    z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    z ^ (z >> 31)
}

/// Moves one orbit after the other to where it helps most until none helps.
fn exchanged(judge: &Judge, mut chosen: Vec<usize>) -> Vec<usize> {
    let mut rank = judge.rank(&chosen);
    for _ in 0..ROUNDS {
        let before = rank;
        for place in 0..chosen.len() {
            let here = chosen[place];
            let mut others = chosen.clone();
            others.remove(place);
            let mut best = here;
            for orbit in 0..judge.unit.orbits.len() {
                let same = judge.unit.orbits[orbit].len() == judge.unit.orbits[here].len();
                if !same || !judge.fits(&others, orbit) {
                    continue;
                }
                chosen[place] = orbit;
                let found = judge.rank(&chosen);
                if found < rank {
                    (rank, best) = (found, orbit);
                }
            }
            chosen[place] = best;
        }
        if rank >= before {
            break;
        }
    }
    chosen.sort_unstable();
    chosen
}
