//! The surfaces of a response laid out for many draws: every reading side by side, no allocation.

use serde_json::{Value, json};

use crate::estimate::chain::elastic::response::{Departure, Readings, Response};

/// Readings side by side, one more than there are: an even number fills the registers.
type Lanes = [f64; 8];

/// A force at which surfaces stand, with their coefficients.
#[derive(Clone, Debug)]
struct Node {
    /// Logarithm of the force over the nominal one.
    force: f64,
    /// At the centre, slope and curvature along each variable.
    centre: Lanes,
    along: Vec<[Lanes; 2]>,
}

/// The surfaces of a response, with the same answers but for rounding.
///
/// Twists are those of the nominal force at every force, and the weights of the forces add to one, so
/// that they enter once.
/// Checked: `flat_surfaces_are_those_of_the_response`.
#[derive(Clone, Debug)]
pub(super) struct Flat {
    nodes: Vec<Node>,
    twist: Vec<Lanes>,
}

impl Flat {
    pub(super) fn of(response: &Response) -> Self {
        let lanes = |of: &dyn Fn(usize) -> f64| -> Lanes {
            std::array::from_fn(|lane| if lane < 7 { of(lane) } else { 0.0 })
        };
        let nodes = response.forces.iter().zip(&response.surfaces);
        let nodes: Vec<Node> = nodes
            .map(|(force, surfaces)| Node {
                force: *force,
                centre: lanes(&|lane| surfaces[lane].coefficients().0),
                along: (0..response.steps.len())
                    .map(|variable| {
                        [0, 1].map(|power| {
                            lanes(&|lane| surfaces[lane].coefficients().1[variable][power])
                        })
                    })
                    .collect(),
            })
            .collect();
        let pairs = response.surfaces[0][0].coefficients().2.len();
        let twist = (0..pairs)
            .map(|pair| lanes(&|lane| response.surfaces[0][lane].coefficients().2[pair]))
            .collect();
        Self { nodes, twist }
    }

    /// Coefficients node by node, as data.
    pub(super) fn tables(&self) -> Value {
        let nodes = self.nodes.iter();
        json!({
            "nodes": nodes.map(|node| {
                json!({ "force": node.force, "centre": node.centre, "along": node.along })
            }).collect::<Vec<Value>>(),
            "twist": self.twist,
        })
    }

    /// Readings at a departure.
    pub(super) fn at(&self, departure: &Departure) -> Readings {
        let [force, rest @ ..] = departure;
        let last = self.nodes.len() - 1;
        let force = force.clamp(self.nodes[0].force, self.nodes[last].force);
        let above = self.nodes.partition_point(|node| node.force < force);
        let nearest = if above > 0
            && (above > last
                || force - self.nodes[above - 1].force <= self.nodes[above].force - force)
        {
            above - 1
        } else {
            above
        };
        let first = nearest.clamp(1, last - 1) - 1;
        let nodes = &self.nodes[first..first + 3];
        let [a, b, c] = [nodes[0].force, nodes[1].force, nodes[2].force];
        let weights = [
            (force - b) * (force - c) / ((a - b) * (a - c)),
            (force - a) * (force - c) / ((b - a) * (b - c)),
            (force - a) * (force - b) / ((c - a) * (c - b)),
        ];
        let mut read: Lanes = [0.0; 8];
        for (node, weight) in nodes.iter().zip(weights) {
            let mut own = node.centre;
            for ([slope, curvature], x) in node.along.iter().zip(rest) {
                for lane in 0..8 {
                    own[lane] += x * (slope[lane] + curvature[lane] * x);
                }
            }
            for lane in 0..8 {
                read[lane] += weight * own[lane];
            }
        }
        let mut twists = self.twist.iter();
        let variables = nodes[0].along.len();
        for (one, x) in rest[..variables].iter().enumerate() {
            for (y, twist) in rest[one + 1..variables].iter().zip(&mut twists) {
                let both = x * y;
                for lane in 0..8 {
                    read[lane] += twist[lane] * both;
                }
            }
        }
        std::array::from_fn(|lane| read[lane])
    }
}
