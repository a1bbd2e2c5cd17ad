//! What the plan grid finds at nominal, carried over to draws that solve the fast cells.

use crate::resistance::{failure::Failure, path::Path};

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
    /// An infinite answer of the cells stays infinite: some bolt conducts nothing there.
    fn between(from: f64, to: f64) -> Self {
        if from.is_infinite() {
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
    /// From the answers of both at the same load; refused where one of them cannot be.
    pub fn between(cells: &Path, grid: &Path) -> Result<Self, Failure> {
        cells.checked("the cells")?;
        grid.checked("the plan grid")?;
        let correction = |reading: &'static str, of: &dyn Fn(&Path) -> f64| {
            let (from, to) = (of(cells), of(grid));
            // The grid may find a way past a bolt that conducts nothing, never the other way round.
            if from.is_finite() && !to.is_finite() {
                return Err(Failure::NotFinite {
                    network: "the plan grid",
                    reading,
                    value: to,
                });
            }
            Ok(Correction::between(from, to))
        };
        Ok(Self {
            perfect_contact: correction("perfect contact", &|path| path.perfect_contact)?,
            added_by_joint: correction("added by joint", &|path| path.added_by_joint)?,
            node_to_node: correction("node to node", &|path| path.node_to_node)?,
            interface_drop: correction("interface drop", &|path| path.interface_drop)?,
            hottest: correction("hottest", &|path| path.hottest)?,
        })
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
