//! Bounds of the model form, and what they do to a path.

use crate::{
    estimate::{
        Chain, Failure, Realisation,
        chain::{conditions::Conditions, cone::ConeModel},
    },
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
/// On two joints solved in three dimensions it read what the joint adds 7 and 11 % high; rigid
/// heads lowered it by 3 % (judgement on these).
const PLAN_FORM: [f64; 2] = [0.83, 1.05];
/// Gap between the bolts over F L/(E t²) of the plate that gives most, for the upper factor in gas.
///
/// F is the clamp force of a bolt, L half the side of a bolt's share of the faces. Bending of the
/// plates outside the contact makes the gap proportional to this; the mean gap of the same two
/// joints was 0.086 and 0.055 of it, and 0.1 leaves room for the quantile (judgement).
const GAP_SCALE: f64 = 0.1;
/// Added to the upper factor where the far plate holds the thread: the cone stands for a head on
/// both faces, and a tapped plate raised the resistance of the reference joints by 4 and 5 %.
const TAPPED: f64 = 0.05;
/// Upper factor for a filled joint, whose layer thickens where the plates part (judgement).
const OPEN_LAYER: f64 = 1.2;

impl ConeModel {
    /// Bounds of the model form: of the network, and of what the cone does not know.
    pub(super) fn form_bounds(&self, chain: &Chain) -> Result<Bounds, Failure> {
        let [low, mut high] = if self.geometry.grid.is_none() {
            ROUND_FORM
        } else {
            PLAN_FORM
        };
        let tapped = |group: &Fastener| !matches!(group.engagement, Engagement::Nut);
        if chain.joint().fasteners.iter().any(tapped) {
            high += TAPPED;
        }
        high = if chain.joint().filler(0).is_some() {
            high.max(OPEN_LAYER)
        } else {
            high + self.gas_share(chain)? * Self::gap_growth(chain)?
        };
        Ok(Bounds::uniform([low, 1.0, high]))
    }

    /// Gap between the bolts over the distance of the closed faces as the gas meets them, 1.
    ///
    /// ```text
    /// δ/(Y + M),   δ = 0.1 max F L/(E t²)
    /// ```
    fn gap_growth(chain: &Chain) -> Result<f64, Failure> {
        let conditions = chain.conditions(0, &Realisation::default())?;
        let local = &conditions.faces[0].local;
        let Some(gas) = local.interface().gas else {
            return Ok(0.0);
        };
        let bolts = chain.joint().clamping() as f64;
        let force = conditions.forces.iter().sum::<f64>() / bolts;
        let reach = 0.5 * (chain.footprint() / bolts).sqrt();
        let softest = [chain.joint().warm(), chain.joint().cold()]
            .map(|plate| plate.material.youngs_modulus.value * plate.thickness.powi(2))
            .into_iter()
            .fold(f64::INFINITY, f64::min);
        let gap = GAP_SCALE * force * reach / softest;
        Ok(gap / (local.separation(0.0) + gas.parameter))
    }

    /// Share of what the gas takes off the joint's resistance, by the cells: 0 in vacuum, near 1
    /// where the gas carries nearly all.
    pub(super) fn gas_share(&self, chain: &Chain) -> Result<f64, Failure> {
        if matches!(chain.joint().service.medium, Medium::Vacuum) {
            return Ok(0.0);
        }
        let conditions = chain.conditions(0, &Realisation::default())?;
        let Some(bare) = conditions.without_gas() else {
            return Ok(0.0);
        };
        let added = |under: &Conditions| {
            let clamped = self.clamped(under);
            self.cells().solve(&clamped.load()).added_by_joint
        };
        let (filled, empty) = (added(&conditions), added(&bare));
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

/// The path moved by what the grid may err: all of it alike, but for the ring sum.
pub(super) fn with_error(path: Path, numerical: f64) -> Path {
    if numerical == 0.0 {
        return path;
    }
    let factor = 1.0 + numerical;
    Path {
        node_to_node: path.node_to_node * factor,
        added_by_joint: path.added_by_joint * factor,
        source_to_sink: path.source_to_sink * factor,
        perfect_contact: path.perfect_contact * factor,
        hottest: path.hottest * factor,
        interface_drop: path.interface_drop * factor,
        ..path
    }
}
