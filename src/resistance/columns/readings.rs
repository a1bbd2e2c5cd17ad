//! From the solved temperatures to the readings.

use std::sync::Arc;

use crate::{
    numerics::columns::Plan,
    resistance::columns::{
        Conductivity, Health, Heat, Hottest, Seat, Sink, Stack, Terminals,
        equations::Equations,
        terminals::{Ends, Grip},
    },
};

/// Columns with less solid around them say nothing about the plate.
const MOSTLY: f64 = 0.5;

/// All that the readings are made from.
#[derive(Clone, Copy)]
pub(super) struct Reader<'a> {
    pub stack: &'a Arc<Stack>,
    pub terminals: &'a Terminals,
    pub conductivity: &'a [Conductivity],
    pub ends: &'a Ends,
    /// Local conductance times area, W/K.
    pub conductances: &'a [Vec<Vec<f64>>],
}

/// Whether some interface conducts nothing and no bolt goes past it.
pub(super) fn blocked(terminals: &Terminals, ends: &Ends, conductances: &[Vec<Vec<f64>>]) -> bool {
    let past = terminals
        .bolts
        .iter()
        .zip(&ends.bolts)
        .any(|(bolt, ends)| bolt.strength > 0.0 && ends.is_some());
    let open = |parts: &Vec<Vec<f64>>| parts.iter().flatten().all(|g| *g <= 0.0);
    !past && conductances.iter().any(open)
}

/// Index of the nearest bolt for every column; empty without bolts.
fn nearest_bolts(plan: &Plan, terminals: &Terminals) -> Vec<usize> {
    let distance = |column: usize, bolt: usize| {
        let [x, y] = plan.place(column);
        let at = terminals.bolts[bolt].at;
        (x - at[0]).hypot(y - at[1])
    };
    let nearest = |column: usize| {
        (0..terminals.bolts.len())
            .min_by(|a, b| distance(column, *a).total_cmp(&distance(column, *b)))
    };
    (0..plan.columns()).filter_map(nearest).collect()
}

fn series(conductances: impl Iterator<Item = f64>) -> f64 {
    conductances.map(f64::recip).sum::<f64>().recip()
}

impl Reader<'_> {
    fn contacts(&self) -> (f64, Vec<f64>, Vec<f64>) {
        let per_interface: Vec<f64> = self
            .conductances
            .iter()
            .map(|parts| parts.iter().flatten().sum())
            .collect();
        let owners = nearest_bolts(&self.stack.plan, self.terminals);
        let per_bolt = (0..self.terminals.bolts.len())
            .map(|bolt| {
                series(self.conductances.iter().map(|parts| {
                    let own = |part: &Vec<f64>| -> f64 {
                        let pairs = part.iter().zip(&owners);
                        pairs.filter(|(_, o)| **o == bolt).map(|(g, _)| g).sum()
                    };
                    parts.iter().map(own).sum()
                }))
            })
            .collect();
        (
            series(per_interface.iter().copied()),
            per_bolt,
            per_interface,
        )
    }

    /// Isothermal planes at the faces that heat must cross can only help it.
    ///
    /// Layers beside which heat may enter, leave or pass are left out.
    fn one_dimensional(&self, contact: f64) -> f64 {
        let bodies = &self.stack.bodies;
        let last = bodies.len() - 1;
        let bolts = || {
            self.terminals
                .bolts
                .iter()
                .filter(|bolt| bolt.strength > 0.0)
        };
        let threaded = bolts().any(|bolt| matches!(bolt.seat, Seat::Thread { .. }));
        let mut sum = contact.recip();
        for (index, (body, conductivity)) in bodies.iter().zip(self.conductivity).enumerate() {
            let sources = self.ends.source.iter().flat_map(|(patches, _)| patches);
            let entry = if index == 0 {
                sources.map(|patch| patch.node).min()
            } else {
                self.stack.faces[index - 1]
                    .iter()
                    .map(|part| part.lower)
                    .min()
            };
            let exit = if index < last {
                self.stack.faces[index].iter().map(|part| part.upper).max()
            } else if self.ends.leaves_by_side() || threaded {
                None
            } else {
                self.ends.sinks.iter().map(|patch| patch.node).max()
            };
            let (Some(entry), Some(exit)) = (entry, exit) else {
                continue;
            };
            for (own, (layer, first)) in body.layers.iter().zip(body.first_nodes()).enumerate() {
                let top = first + layer.heights.len() * layer.degree;
                if exit <= first && top <= entry {
                    let conducts: f64 = self
                        .stack
                        .made((index, own), *conductivity)
                        .iter()
                        .map(|(shares, conductivity)| {
                            let shares = shares.iter().enumerate();
                            let area: f64 = shares
                                .map(|(cell, share)| share * self.stack.plan.cell_area(cell))
                                .sum();
                            conductivity.through * area
                        })
                        .sum();
                    let height: f64 = layer.heights.iter().sum();
                    sum += height / conducts;
                }
            }
        }
        (sum.recip() + bolts().map(|bolt| bolt.strength).sum::<f64>()).recip()
    }

    fn coolant_drop(&self, sink_mean: f64) -> Option<f64> {
        let films = |sink: &Sink| matches!(sink, Sink::Film { .. });
        self.terminals.sinks.iter().all(films).then_some(sink_mean)
    }

    /// Readings of a solution.
    pub(super) fn heat(&self, equations: &Equations, health: Health) -> Heat {
        let stack = self.stack;
        let heat = equations.heat();
        let columns = stack.plan.columns();
        let temperatures: Vec<Vec<f64>> = stack
            .bodies
            .iter()
            .enumerate()
            .map(|(index, body)| {
                let nodes = body.nodes();
                (0..columns * nodes)
                    .map(|at| {
                        let place = equations.place(index, at % nodes, at / nodes);
                        equations.rise[place] / heat
                    })
                    .collect()
            })
            .collect();
        let sink_mean = equations.sink_mean() / heat;
        let body_means: Vec<f64> = temperatures
            .iter()
            .enumerate()
            .map(|(index, values)| {
                let volumes = stack.volumes(index);
                mean(values.iter().copied().zip(volumes)) - sink_mean
            })
            .collect();
        let means = equations.zone_means().into_iter();
        let zones = means.map(|mean| mean / heat - sink_mean).collect();
        let (interface_drops, flux) = self.across(&temperatures);
        let (contact, contact_per_bolt, contact_per_interface) = self.contacts();
        Heat {
            stack: stack.clone(),
            contact,
            contact_per_bolt,
            contact_per_interface,
            source_to_sink: equations.source_mean() / heat - sink_mean,
            zones,
            node_to_node: body_means[0] - body_means[body_means.len() - 1],
            body_means,
            interface_drops,
            hottest: self.hottest(&temperatures[0], sink_mean),
            sink_mean,
            coolant_drop: self.coolant_drop(sink_mean),
            one_dimensional: self.one_dimensional(contact),
            temperatures,
            flux,
            health,
        }
    }

    /// Mean drop across every interface, and the flux through every part of it.
    fn across(&self, temperatures: &[Vec<f64>]) -> (Vec<f64>, Vec<Vec<Vec<f64>>>) {
        let stack = self.stack;
        let mut drops = Vec::new();
        let mut flux = Vec::new();
        for (interface, parts) in stack.faces.iter().enumerate() {
            let nodes = [interface, interface + 1].map(|body| stack.bodies[body].nodes());
            let mut pairs = Vec::new();
            let mut own = Vec::new();
            for (part, conductances) in parts.iter().zip(&self.conductances[interface]) {
                let drop = |column: usize| {
                    temperatures[interface][column * nodes[0] + part.upper]
                        - temperatures[interface + 1][column * nodes[1] + part.lower]
                };
                let weights = || part.weights.iter().enumerate();
                pairs.extend(weights().map(|(column, weight)| (drop(column), *weight)));
                let through = |(column, weight): (usize, &f64)| {
                    if *weight > 0.0 {
                        conductances[column] / weight * drop(column)
                    } else {
                        0.0
                    }
                };
                own.push(weights().map(through).collect());
            }
            drops.push(mean(pairs.into_iter()));
            flux.push(own);
        }
        (drops, flux)
    }

    fn hottest(&self, temperatures: &[f64], sink_mean: f64) -> Hottest {
        let body = &self.stack.bodies[0];
        let heights = body.heights();
        let mut hottest = Hottest {
            rise: f64::NEG_INFINITY,
            at: [0.0; 3],
        };
        for (node, height) in heights.iter().enumerate() {
            for (column, solid) in self.stack.solid(0, node).into_iter().enumerate() {
                let rise = temperatures[column * heights.len() + node] - sink_mean;
                if solid >= MOSTLY && rise > hottest.rise {
                    let [x, y] = self.stack.plan.place(column);
                    hottest = Hottest {
                        rise,
                        at: [x, y, *height],
                    };
                }
            }
        }
        hottest
    }

    /// Readings where no path leads through: infinite above the interface that blocks, zero below.
    pub(super) fn blocked(&self) -> Heat {
        let stack = self.stack;
        let blocks = |parts: &Vec<Vec<f64>>| parts.iter().flatten().all(|g| *g <= 0.0);
        let lowest = self.conductances.iter().rposition(blocks).unwrap_or(0);
        let level = |body: usize| if body <= lowest { f64::INFINITY } else { 0.0 };
        let (contact, contact_per_bolt, contact_per_interface) = self.contacts();
        let columns = stack.plan.columns();
        let film = |sink: &Sink| matches!(sink, Sink::Film { .. });
        let drains: f64 = self
            .ends
            .sinks
            .iter()
            .map(|patch| match patch.grip {
                Grip::Film(coefficient) => coefficient * patch.covered.area(),
                _ => 0.0,
            })
            .sum();
        Heat {
            stack: stack.clone(),
            contact,
            contact_per_bolt,
            contact_per_interface,
            source_to_sink: f64::INFINITY,
            zones: vec![f64::INFINITY; self.ends.source.len()],
            node_to_node: f64::INFINITY,
            body_means: (0..stack.bodies.len()).map(level).collect(),
            interface_drops: self
                .conductances
                .iter()
                .map(|parts| if blocks(parts) { f64::INFINITY } else { 0.0 })
                .collect(),
            hottest: Hottest {
                rise: f64::INFINITY,
                at: [0.0; 3],
            },
            sink_mean: if drains > 0.0 { drains.recip() } else { 0.0 },
            coolant_drop: self
                .terminals
                .sinks
                .iter()
                .all(film)
                .then(|| drains.recip()),
            one_dimensional: f64::INFINITY,
            temperatures: stack
                .bodies
                .iter()
                .enumerate()
                .map(|(index, body)| vec![level(index); columns * body.nodes()])
                .collect(),
            flux: stack
                .faces
                .iter()
                .map(|parts| vec![vec![0.0; columns]; parts.len()])
                .collect(),
            health: Health {
                iterations: 0,
                residual: 0.0,
                balance: 0.0,
                unknowns: 0,
            },
        }
    }
}

/// Weighted mean.
fn mean(values: impl Iterator<Item = (f64, f64)>) -> f64 {
    let (mut sum, mut weights) = (0.0, 0.0);
    for (value, weight) in values {
        sum += value * weight;
        weights += weight;
    }
    sum / weights
}
