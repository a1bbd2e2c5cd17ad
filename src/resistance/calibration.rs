//! What the plan grid finds at nominal, carried over to draws that solve the fast cells.

use crate::resistance::path::Path;

/// Corrections that turn the cells' answer into the plan grid's at one load.
///
/// Perfect contact and what the joint adds to it are corrected apart, because they answer
/// differently to force, gas and conductivity. A force halved or doubled and a gap conductance
/// 30 % off move the corrected source to sink within about 2 % of the grid's own answer; a spread
/// of conductivity of 10 % within 5 %.
/// Checked: `calibrated_cells_follow_the_grid`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Calibration {
    perfect_contact: Correction,
    added_by_joint: Correction,
    node_to_node: Correction,
    interface_drop: Correction,
    hottest: Correction,
}

/// A factor between positive values; a difference where one of them is not.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Correction {
    Factor(f64),
    Difference(f64),
}

impl Correction {
    fn between(from: f64, to: f64) -> Self {
        if !from.is_finite() || !to.is_finite() {
            Self::Factor(1.0)
        } else if from > 0.0 && to > 0.0 {
            Self::Factor(to / from)
        } else {
            Self::Difference(to - from)
        }
    }

    fn of(self, value: f64) -> f64 {
        match self {
            Self::Factor(factor) => value * factor,
            Self::Difference(difference) => value + difference,
        }
    }
}

impl Calibration {
    /// From the answers of both at the same load.
    pub fn between(cells: &Path, grid: &Path) -> Self {
        let correction = |of: &dyn Fn(&Path) -> f64| Correction::between(of(cells), of(grid));
        Self {
            perfect_contact: correction(&|path| path.perfect_contact),
            added_by_joint: correction(&|path| path.added_by_joint),
            node_to_node: correction(&|path| path.node_to_node),
            interface_drop: correction(&|path| path.interface_drop),
            hottest: correction(&|path| path.hottest),
        }
    }

    /// The corrected answer; contact, bounds and film drop stay as they are.
    pub fn applied(&self, mut path: Path) -> Path {
        path.perfect_contact = self.perfect_contact.of(path.perfect_contact);
        path.added_by_joint = self.added_by_joint.of(path.added_by_joint);
        path.source_to_sink = path.perfect_contact + path.added_by_joint;
        path.node_to_node = self.node_to_node.of(path.node_to_node);
        path.interface_drop = self.interface_drop.of(path.interface_drop);
        path.hottest = self.hottest.of(path.hottest);
        path
    }
}
