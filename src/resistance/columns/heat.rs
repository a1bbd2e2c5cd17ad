//! What a solution tells: resistances, temperatures, fluxes and its health.

use std::sync::Arc;

use crate::resistance::{
    Path,
    columns::{Perfect, Side, Stack},
};

/// How a solution was come by.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Health {
    /// Iterations of conjugate gradients.
    pub iterations: usize,
    /// Residual left over the load.
    pub residual: f64,
    /// Heat lost between source and sink, over the heat.
    pub balance: f64,
    /// Unknowns.
    pub unknowns: usize,
}

/// The hottest point of the first body.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hottest {
    /// Above the mean sink surface, K/W.
    pub rise: f64,
    /// x and y, m; height above the lowest face of the body, m.
    pub at: [f64; 3],
}

/// Heat through a stack, per watt.
///
/// Resistances and means refer to the mean sink surface, fields to the coolant or the held
/// temperature. Infinite where no path leads through.
#[derive(Clone, Debug, PartialEq)]
pub struct Heat {
    pub(super) stack: Arc<Stack>,
    /// ∫ h dA over all faces, interfaces in series, W/K.
    pub contact: f64,
    /// The same for the columns nearest to each bolt, W/K.
    pub contact_per_bolt: Vec<f64>,
    /// The same for each interface, W/K.
    pub contact_per_interface: Vec<f64>,
    /// Mean of the heated zones, weighted with their heat, to the mean sink surface, K/W.
    pub source_to_sink: f64,
    /// Mean of every heated zone above the mean sink surface, K/W.
    pub zones: Vec<f64>,
    /// Volume mean of the first body above that of the last, K/W.
    pub node_to_node: f64,
    /// Volume mean of every body above the mean sink surface, K/W.
    pub body_means: Vec<f64>,
    /// Area mean of the drop across every interface, K/W.
    pub interface_drops: Vec<f64>,
    /// Hottest point of the first body.
    pub hottest: Hottest,
    /// Mean sink surface above the coolant, weighted with what it conducts, K/W.
    ///
    /// What a held sink leaves here is what its stiff film leaves; it is no physical drop.
    pub sink_mean: f64,
    /// From the mean sink surface to the coolant, K/W; none without a film.
    pub coolant_drop: Option<f64>,
    /// Plates and faces in series with isothermal planes between them, bolts beside them, K/W.
    pub one_dimensional: f64,
    /// Temperatures of every body: `column · nodes + node`, nodes upwards, K/W.
    ///
    /// Values in holes carry no meaning; `Stack::solid` tells which they are.
    pub temperatures: Vec<Vec<f64>>,
    /// Flux down through every part of every interface at every column, 1/m².
    pub flux: Vec<Vec<Vec<f64>>>,
    /// How the solution was come by.
    pub health: Health,
}

impl Heat {
    /// The readings beside perfect contact, in the form that all networks share.
    ///
    /// ```text
    /// R ≥ max(R_perfect, 1/(1/(Σ t/(k A) + Σ 1/G) + Σ G_bolt))
    /// ```
    ///
    /// Valid: both bounds hold for the local conductance as given. Source: whatever conducts without
    /// resistance in a network lowers that of the whole, textbook, from memory. Checked: `resistance_keeps_above_its_bounds`.
    pub fn path(&self, perfect: &Perfect) -> Path {
        Path {
            contact: self.contact,
            contact_per_bolt: self.contact_per_bolt.clone(),
            source_to_sink: self.source_to_sink,
            coolant_drop: self.coolant_drop,
            perfect_contact: perfect.source_to_sink,
            added_by_joint: self.source_to_sink - perfect.source_to_sink,
            node_to_node: self.node_to_node,
            interface_drop: self.interface_drops.iter().sum(),
            hottest: self.hottest.rise,
            resistance_lower: perfect.source_to_sink.max(self.one_dimensional),
            resistance_upper: None,
        }
    }

    /// Temperatures of a face of a body at every column: its lowest or its highest nodes, K/W.
    pub fn face(&self, body: usize, side: Side) -> Vec<f64> {
        let nodes = self.stack.bodies[body].nodes();
        let node = match side {
            Side::Down => 0,
            Side::Up => nodes - 1,
        };
        let values = self.temperatures[body].iter();
        values.skip(node).step_by(nodes).copied().collect()
    }

    /// The stack that was solved.
    pub fn stack(&self) -> &Stack {
        &self.stack
    }
}
