//! What a layout is judged by: the goal, the limited quantity, its limit.

use crate::{
    joint::{Joint, Limit, Plane, RequirementKind},
    layout::Failure,
    resistance::Path,
    uncertainty::Answer,
};

/// What a search makes small.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Goal {
    /// The number of bolts.
    Bolts,
    /// The mass of the fasteners.
    Mass,
    /// The resistance.
    Resistance,
}

impl Goal {
    /// As users write it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Bolts => "bolts",
            Self::Mass => "mass",
            Self::Resistance => "resistance",
        }
    }
}

/// The quantity a layout is judged by, as a resistance.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Measure {
    /// Mean source to mean sink surface.
    SourceToSink,
    /// Hottest point to mean sink surface.
    Hottest,
    /// Mean drop across the interface.
    InterfaceDrop,
    /// Mean of the first plate to mean of the last.
    NodeToNode,
    /// What the joint adds.
    Added,
    /// The faying faces alone.
    Contact,
}

impl Measure {
    /// As tables name it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::SourceToSink => "source to sink",
            Self::Hottest => "hottest point to sink",
            Self::InterfaceDrop => "drop across the interface",
            Self::NodeToNode => "node to node",
            Self::Added => "added by the joint",
            Self::Contact => "contact only",
        }
    }

    /// The same as an answer of the draws.
    pub(super) const fn answer(self) -> Answer {
        match self {
            Self::SourceToSink => Answer::SourceToSink,
            Self::Hottest => Answer::Hottest,
            Self::InterfaceDrop => Answer::InterfaceDrop,
            Self::NodeToNode => Answer::NodeToNode,
            Self::Added => Answer::AddedByJoint,
            Self::Contact => Answer::Contact,
        }
    }

    /// Its value on a solved path, K/W.
    pub fn of(self, path: &Path) -> f64 {
        match self {
            Self::SourceToSink => path.source_to_sink,
            Self::Hottest => path.hottest,
            Self::InterfaceDrop => path.interface_drop,
            Self::NodeToNode => path.node_to_node,
            Self::Added => path.added_by_joint,
            Self::Contact => path.contact.recip(),
        }
    }
}

/// The judged quantity with its limit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Target {
    /// The quantity.
    pub measure: Measure,
    /// Its limit, K/W, and the side on which it must lie.
    pub limit: Option<(f64, Limit)>,
}

impl Target {
    /// What a joint requires, as a resistance.
    ///
    /// A limit of conductance is one of its inverse on the other side; a rise is divided by the heat.
    pub fn of(joint: &Joint, goal: Goal) -> Result<Self, Failure> {
        let Some(require) = joint.service.require else {
            return match goal {
                Goal::Resistance => Ok(Self {
                    measure: Measure::SourceToSink,
                    limit: None,
                }),
                Goal::Bolts | Goal::Mass => Err(Failure::NoRequirement),
            };
        };
        let heat = || joint.service.heat.ok_or(Failure::NoHeat);
        let (measure, limit, bound) = match require.kind {
            RequirementKind::Rise => (
                Measure::SourceToSink,
                require.limit / heat()?,
                require.bound,
            ),
            RequirementKind::HottestRise => {
                (Measure::Hottest, require.limit / heat()?, require.bound)
            }
            RequirementKind::AboveCoolant | RequirementKind::HottestAboveCoolant => {
                return Err(Failure::FromCoolant);
            }
            RequirementKind::InterfaceDrop => (
                Measure::InterfaceDrop,
                require.limit / heat()?,
                require.bound,
            ),
            RequirementKind::Resistance(plane) => (plane.into(), require.limit, require.bound),
            RequirementKind::Conductance(plane) => {
                let bound = match require.bound {
                    Limit::Most => Limit::Least,
                    Limit::Least => Limit::Most,
                };
                (plane.into(), require.limit.recip(), bound)
            }
        };
        Ok(Self {
            measure,
            limit: Some((limit, bound)),
        })
    }

    /// Whether a resistance meets the limit; without one it does.
    pub fn meets(&self, resistance: f64) -> bool {
        match self.limit {
            None => resistance.is_finite(),
            Some((limit, Limit::Most)) => resistance <= limit,
            Some((limit, Limit::Least)) => resistance >= limit,
        }
    }

    /// What ranks a resistance, smaller being better: a joint that must resist shall resist.
    pub fn rank(&self, resistance: f64) -> f64 {
        match self.limit {
            Some((_, Limit::Least)) => -resistance,
            _ => resistance,
        }
    }
}

impl From<Plane> for Measure {
    fn from(plane: Plane) -> Self {
        match plane {
            Plane::Contact => Self::Contact,
            Plane::NodeToNode => Self::NodeToNode,
            Plane::AddedByJoint => Self::Added,
            Plane::SourceToSink => Self::SourceToSink,
        }
    }
}
