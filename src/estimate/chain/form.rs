//! Bounds of the model form, and what they do to a path.

use crate::{
    estimate::{Chain, Failure, Realisation},
    joint::{Bounds, Engagement, Fastener, Medium},
    resistance::Path,
};

/// What the joint may cost beyond or below the closed-form field and the networks, as factors on
/// what it adds; one bolt in the middle of two discs, in vacuum.
///
/// From 43 reference solutions: the ring network errs by 0 to +10 % (Bi ≤ 1, worst +22 % at
/// Bi 10), a rigid head or stuck faces lower the resistance by 1 to 4 %, the closed-form field
/// moves it by ±1.4 %.
const ROUND_FORM: [f64; 2] = [0.85, 1.03];
/// The same for the plan grid of several bolts in vacuum.
///
/// On two joints solved in three dimensions it read what the joint adds 7 and 11 % high; a tapped
/// far plate raised it by 5 %, rigid heads lowered it by 3 % (judgement on these).
const PLAN_FORM: [f64; 2] = [0.83, 1.05];
/// Upper factor for bare faces in a gas: the cone knows no gap, and the true joint added 1.4 and
/// 1.8 times as much on the same two joints.
const OPEN_GAP: f64 = 1.8;
/// Added to the upper factor where the far plate holds the thread: the cone stands for a head on
/// both faces, and a tapped plate raised the resistance of the reference joints by 4 and 5 %.
const TAPPED: f64 = 0.05;
/// Upper factor for a filled joint, whose layer thickens where the plates part (judgement).
const OPEN_LAYER: f64 = 1.2;
impl Chain<'_> {
    /// Bounds of the model form: of the network, and of what the cone does not know.
    pub(super) fn form_bounds(&self) -> Result<Bounds, Failure> {
        let [low, mut high] = if self.geometry.grid.is_none() {
            ROUND_FORM
        } else {
            PLAN_FORM
        };
        let tapped = |group: &Fastener| !matches!(group.engagement, Engagement::Nut);
        if self.joint.fasteners.iter().any(tapped) {
            high += TAPPED;
        }
        high = if self.joint.filler.is_some() {
            high.max(OPEN_LAYER)
        } else {
            high + (OPEN_GAP - high) * self.gas_share()?
        };
        Ok(Bounds {
            low,
            nominal: 1.0,
            high,
        })
    }

    /// Share of what the gas takes off the joint's resistance, by the cells: 0 in vacuum, near 1
    /// where the gas carries nearly all.
    fn gas_share(&self) -> Result<f64, Failure> {
        if matches!(self.joint.service.medium, Medium::Vacuum) {
            return Ok(0.0);
        }
        let mut conditions = self.conditions(0, &Realisation::default())?;
        let filled = self.geometry.cells.solve(&conditions.load()).added_by_joint;
        let mut interface = conditions.faces.local.interface().clone();
        interface.gas = None;
        conditions.faces.local = interface.prepare();
        let empty = self.geometry.cells.solve(&conditions.load()).added_by_joint;
        let share = 1.0 - filled / empty;
        Ok(if share.is_finite() {
            share.clamp(0.0, 1.0)
        } else {
            1.0
        })
    }
}

/// The path with the model form applied to what the joint adds.
pub(super) fn with_form(path: Path, form: f64) -> Path {
    let added = path.added_by_joint * form;
    let moved = added - path.added_by_joint;
    Path {
        added_by_joint: added,
        source_to_sink: path.source_to_sink + moved,
        hottest: path.hottest + moved,
        interface_drop: path.interface_drop * form,
        node_to_node: path.node_to_node + moved,
        ..path
    }
}
