//! Both condensed plates and what crosses between them, as one small system.

use crate::{
    numerics::{
        banded::{BandedMatrix, NotPositiveDefinite},
        elements::edge_points,
    },
    resistance::round::{
        Outlet, Pair, Problem,
        plate::{Plate, weighted},
    },
};

/// What became of the plates.
#[derive(Clone, Debug)]
pub(super) enum Meeting {
    /// Heat flows.
    Flowing(Fields),
    /// No path leads through.
    Blocked,
    /// Two held rims touch perfectly: any heat crosses without a drop.
    Shorted,
}

/// Temperatures of both plates above the second plate's own zero, and the heat that flows.
#[derive(Clone, Debug)]
pub(super) struct Fields {
    /// Nodal temperatures less the base.
    pub theta: [Vec<f64>; 2],
    /// Base of each plate.
    pub base: [f64; 2],
    /// Heat that enters, that crosses between the plates, and that leaves, W.
    pub heat: [f64; 3],
    /// Drop across the interface at the shared nodes.
    pub drop: Vec<f64>,
}

/// A temperature as an unknown, if any, plus a constant.
type Unknown = (Option<usize>, f64);

/// The system of one pair of plates.
pub(super) struct Join<'a> {
    pair: &'a Pair,
    shank: f64,
    film: f64,
    /// Temperature of a held source.
    drive: f64,
    /// Conductance between the nodes of each column, W/K; none where they meet perfectly.
    crossing: Vec<Option<[[f64; 3]; 3]>>,
    tied: Vec<bool>,
    numbering: Numbering,
}

/// Which unknown stands for which temperature.
#[derive(Default)]
struct Numbering {
    count: usize,
    shared: [Vec<Unknown>; 2],
    level: [Unknown; 2],
    /// Level on which both plates stand beside their own.
    common: Option<usize>,
    /// Whether any node is tied, so that levels and drive are common to both plates.
    joined: bool,
}

impl Numbering {
    fn next(&mut self) -> usize {
        self.count += 1;
        self.count - 1
    }

    /// Unknown of a place in the border of a plate: shared nodes, then the level.
    fn of(&self, plate: usize, place: usize) -> Unknown {
        self.shared[plate]
            .get(place)
            .copied()
            .unwrap_or(self.level[plate])
    }

    fn value(unknown: Unknown, solved: &[f64]) -> f64 {
        unknown.0.map_or(0.0, |index| solved[index]) + unknown.1
    }
}

impl<'a> Join<'a> {
    pub(super) fn new(problem: &Problem, pair: &'a Pair, conductance: impl Fn(f64) -> f64) -> Self {
        let crossing: Vec<Option<[[f64; 3]; 3]>> = pair
            .shared
            .iter()
            .map(|radii| column(*radii, &conductance))
            .collect();
        let mut tied = vec![false; 2 * crossing.len() + 1];
        for (column, matrix) in crossing.iter().enumerate() {
            if matrix.is_none() {
                tied[2 * column..2 * column + 3].fill(true);
            }
        }
        let mut join = Self {
            pair,
            shank: problem.shank,
            film: problem.outlet.film().unwrap_or(0.0),
            drive: if pair.plates[0].anchored { 1.0 } else { 0.0 },
            crossing,
            tied,
            numbering: Numbering::default(),
        };
        join.number(matches!(problem.outlet, Outlet::Flux(_)));
        join
    }

    /// Chooses the unknowns.
    ///
    /// A plate that nothing holds has its level as an unknown and one node at that level. Over a
    /// film both plates stand on one level, and the first has its own above it: neither a weak film
    /// nor a weak contact then makes small differences of large numbers. Plates that meet perfectly
    /// share one level. A given flux out leaves one level free: zero.
    fn number(&mut self, levelless: bool) {
        let mut numbering = Numbering {
            joined: self.tied.contains(&true),
            ..Numbering::default()
        };
        let [first, second] = &self.pair.plates;
        let loose = [!first.anchored, !second.anchored];
        let pinned = self.tied.iter().position(|tied| *tied).unwrap_or(0);
        // Above the second plate's own zero stands whatever is joined to a held source.
        let shift = if numbering.joined && second.anchored {
            self.drive
        } else {
            0.0
        };
        match (loose, numbering.joined) {
            ([true, true], joined) => {
                if !levelless {
                    numbering.common = Some(numbering.next());
                    numbering.level[1].0 = numbering.common;
                }
                if !joined {
                    numbering.level[0].0 = Some(numbering.next());
                }
            }
            ([true, false], false) => numbering.level[0].0 = Some(numbering.next()),
            // The second plate stands near the source where the contact is better than the film.
            ([false, true], false) => {
                let near = self.contact() > self.film * second.area;
                let level = if near { self.drive } else { 0.0 };
                numbering.level[1] = (Some(numbering.next()), level);
            }
            ([false, true], true) => numbering.level[1].1 = self.drive,
            ([_, false], _) => {}
        }
        for (node, tied) in self.tied.iter().enumerate() {
            let held = [0, 1].map(|plate| self.pair.plates[plate].is_held(node));
            let pin = |plate: usize| {
                let bound = if numbering.joined {
                    loose[0] && loose[1]
                } else {
                    loose[plate]
                };
                node == pinned && bound
            };
            let pins = [pin(0), pin(1)];
            let one = if *tied && held[1] {
                (None, -shift)
            } else if held[0] || pins[0] {
                (None, 0.0)
            } else {
                (Some(numbering.next()), 0.0)
            };
            let other = if *tied {
                (one.0, one.1 + shift)
            } else if held[1] || pins[1] {
                (None, 0.0)
            } else {
                (Some(numbering.next()), shift)
            };
            numbering.shared[0].push(one);
            numbering.shared[1].push(other);
        }
        self.numbering = numbering;
    }

    /// Level of both plates that the first has beside its own.
    fn common_of(&self, plate: usize) -> Option<usize> {
        self.numbering.common.filter(|_| plate == 0)
    }

    /// Conductance of all columns where the plates do not meet perfectly, W/K.
    fn contact(&self) -> f64 {
        let columns = self.crossing.iter().flatten();
        columns.flatten().flatten().sum()
    }

    /// Solves the system.
    pub(super) fn solve(&self) -> Result<Meeting, NotPositiveDefinite> {
        let plates = &self.pair.plates;
        let clash =
            |node: usize| self.tied[node] && plates[0].is_held(node) && plates[1].is_held(node);
        if (0..self.tied.len()).any(clash) {
            return Ok(Meeting::Shorted);
        }
        let conducts = |matrix: &Option<[[f64; 3]; 3]>| matrix.is_none_or(|m| m[1][1] > 0.0);
        if self.shank <= 0.0 && !self.crossing.iter().any(conducts) {
            return Ok(Meeting::Blocked);
        }
        let count = self.numbering.count;
        let mut matrix = BandedMatrix::new(count, count.saturating_sub(1));
        let mut load = vec![0.0; count];
        self.add_plates(&mut matrix, &mut load);
        self.add_crossing(&mut matrix, &mut load);
        let shank = self.add_shank(&mut matrix, &mut load);
        matrix.factor()?.solve(&mut load);
        Ok(Meeting::Flowing(self.read(&load, &shank)))
    }

    fn add_plates(&self, matrix: &mut BandedMatrix, load: &mut [f64]) {
        for (index, plate) in self.pair.plates.iter().enumerate() {
            let (reduced, level) = (plate.reduced(), plate.level());
            let unknowns: Vec<Unknown> = (0..=level)
                .map(|place| self.numbering.of(index, place))
                .collect();
            for (column, one) in unknowns.iter().enumerate() {
                let values = reduced.column(column);
                // Only the film of the second plate couples a level to more than loads.
                if let Some(common) = self.common_of(index).filter(|_| column == level) {
                    load[common] += values[level + 1];
                }
                if let Some(i) = one.0 {
                    load[i] += values[level + 1];
                }
                for (row, other) in unknowns.iter().enumerate() {
                    let value = values[row];
                    if let Some(i) = one.0 {
                        load[i] -= value * other.1;
                        if let Some(j) = other.0
                            && i >= j
                        {
                            matrix.add(i, j, value);
                        }
                    }
                }
            }
        }
    }

    /// Drop between the faces at a shared node: unknowns with their signs, and a constant.
    fn drop(&self, node: usize) -> ([(Option<usize>, f64); 4], f64) {
        let numbering = &self.numbering;
        let [one, other] = [0, 1].map(|plate| numbering.shared[plate][node]);
        let [high, low] = numbering.level;
        let constant = self.drive + one.1 - other.1 + high.1 - low.1;
        (
            [
                (one.0, 1.0),
                (other.0, -1.0),
                (high.0, 1.0),
                (low.0.filter(|_| numbering.common.is_none()), -1.0),
            ],
            constant,
        )
    }

    fn add_crossing(&self, matrix: &mut BandedMatrix, load: &mut [f64]) {
        for (column, crossing) in self.crossing.iter().enumerate() {
            let Some(crossing) = crossing else { continue };
            let drops = [0, 1, 2].map(|node| self.drop(2 * column + node));
            for (row, (ones, _)) in crossing.iter().zip(&drops) {
                for (value, (others, constant)) in row.iter().zip(&drops) {
                    for (one, sign) in ones {
                        let Some(i) = *one else { continue };
                        load[i] -= sign * value * constant;
                        for (other, factor) in others {
                            if let Some(j) = *other
                                && i >= j
                            {
                                matrix.add(i, j, sign * factor * value);
                            }
                        }
                    }
                }
            }
        }
    }

    /// Adds the shank: Q = (c + g·x)/(1/G + own), x the unknowns.
    fn add_shank(&self, matrix: &mut BandedMatrix, load: &mut [f64]) -> Shank {
        let mut shank = Shank::default();
        if self.shank <= 0.0 {
            return shank;
        }
        shank.difference = vec![0.0; load.len()];
        shank.constant = self.drive;
        shank.resistance = self.shank.recip();
        for (index, plate) in self.pair.plates.iter().enumerate() {
            let sign = if index == 0 { 1.0 } else { -1.0 };
            let (reduced, level) = (plate.reduced(), plate.level());
            let head = level + 2;
            shank.resistance -= reduced[(head, head)];
            shank.constant -= sign * reduced[(head, level + 1)];
            if let Some(common) = self.common_of(index) {
                shank.difference[common] += sign * reduced[(level, head)];
            }
            for place in 0..=level {
                let (unknown, constant) = self.numbering.of(index, place);
                let weight = sign * reduced[(place, head)];
                shank.constant += weight * constant;
                if let Some(i) = unknown {
                    shank.difference[i] += weight;
                }
            }
        }
        for (i, one) in shank.difference.iter().enumerate() {
            load[i] -= one * shank.constant / shank.resistance;
            for (j, other) in shank.difference.iter().enumerate().take(i + 1) {
                matrix.add(i, j, one * other / shank.resistance);
            }
        }
        shank
    }

    fn read(&self, solved: &[f64], shank: &Shank) -> Fields {
        let plates = &self.pair.plates;
        let through_shank = shank.heat(solved);
        let values = [0, 1].map(|plate| -> Vec<f64> {
            self.numbering.shared[plate]
                .iter()
                .map(|unknown| Numbering::value(*unknown, solved))
                .collect()
        });
        let level = self
            .numbering
            .level
            .map(|unknown| Numbering::value(unknown, solved));
        let theta = [0, 1].map(|plate| {
            let under_head = if plate == 0 {
                -through_shank
            } else {
                through_shank
            };
            plates[plate].theta(&values[plate], [level[plate], under_head])
        });
        let drop: Vec<f64> = (0..self.tied.len())
            .map(|node| {
                let (terms, constant) = self.drop(node);
                let sum = |(index, sign): &(Option<usize>, f64)| {
                    index.map_or(0.0, |index| sign * solved[index])
                };
                terms.iter().map(sum).sum::<f64>() + constant
            })
            .collect();
        let common = self.numbering.common.map_or(0.0, |index| solved[index]);
        let base = [self.drive + level[0] + common, level[1]];
        let across = self.across(
            &drop,
            [
                (&values[0], [level[0], -through_shank]),
                (&values[1], [level[1], through_shank]),
            ],
        );
        // What crosses at a held node never shows inside its plate.
        let at_held = |plate: usize| -> f64 {
            let nodes = across.iter().enumerate();
            nodes
                .filter(|(node, _)| plates[plate].is_held(*node))
                .map(|(_, heat)| heat)
                .sum::<f64>()
                + plates[plate].head_held * through_shank
        };
        let entering = if plates[0].anchored {
            weighted(&plates[0].reaction, &theta[0]) + at_held(0)
        } else {
            plates[0].heat
        };
        let leaving = if plates[1].anchored {
            at_held(1) - weighted(&plates[1].reaction, &theta[1])
        } else if self.film > 0.0 {
            let mean = base[1] + weighted(&plates[1].face_mean, &theta[1]);
            self.film * plates[1].area * mean
        } else {
            -plates[1].heat
        };
        let crossing = across.iter().sum::<f64>() + through_shank;
        Fields {
            theta,
            base,
            heat: [entering, crossing, leaving],
            drop,
        }
    }

    /// Heat through the interface by node: conductance times drop, or what a tied node passes on.
    fn across(&self, drop: &[f64], sides: [Side; 2]) -> Vec<f64> {
        let mut across = vec![0.0; drop.len()];
        for (column, crossing) in self.crossing.iter().enumerate() {
            let Some(crossing) = crossing else { continue };
            for (node, row) in crossing.iter().enumerate() {
                let products = row.iter().zip(&drop[2 * column..]);
                across[2 * column + node] +=
                    products.map(|(value, drop)| value * drop).sum::<f64>();
            }
        }
        for node in (0..drop.len()).filter(|node| self.tied[*node]) {
            // The balance of a held node is not known; then the other plate tells.
            let plate = usize::from(self.pair.plates[0].is_held(node));
            let given = given_off(&self.pair.plates[plate], node, sides[plate]);
            across[node] = if plate == 0 { given } else { -given };
        }
        across
    }
}

/// θ on the shared face of a plate; its level and the watts under its head.
type Side<'a> = (&'a [f64], [f64; 2]);

/// Heat that a plate gives off at a node of the shared face.
fn given_off(plate: &Plate, node: usize, (shared, [level, under_head]): Side) -> f64 {
    let column = plate.reduced().column(node);
    let place = plate.level();
    let kept: f64 = shared.iter().zip(column.iter()).map(|(t, k)| t * k).sum();
    column[place + 1] + under_head * column[place + 2] - kept - level * column[place]
}

/// What the shank sees of the unknowns.
#[derive(Default)]
struct Shank {
    /// Difference of the means under the heads by unknown.
    difference: Vec<f64>,
    constant: f64,
    /// Of the shank and of the plates under its heads alone, K/W; 0 where there is no shank.
    resistance: f64,
}

impl Shank {
    fn heat(&self, solved: &[f64]) -> f64 {
        if self.resistance <= 0.0 {
            return 0.0;
        }
        let difference: f64 = self.difference.iter().zip(solved).map(|(g, x)| g * x).sum();
        (self.constant + difference) / self.resistance
    }
}

/// ∫ h φ φ 2πr dr between the nodes of one column; none where h is infinite anywhere.
fn column(radii: [f64; 2], conductance: &impl Fn(f64) -> f64) -> Option<[[f64; 3]; 3]> {
    let mut matrix = [[0.0; 3]; 3];
    for point in edge_points(radii) {
        let local = conductance(point.radius);
        if local.is_infinite() {
            return None;
        }
        for (row, one) in matrix.iter_mut().zip(point.shapes) {
            for (value, other) in row.iter_mut().zip(point.shapes) {
                *value += local * point.area * one * other;
            }
        }
    }
    Some(matrix)
}
