//! The answers of a draw that have a band.

use crate::estimate::Drawn;

/// A resistance that draws leave behind.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Answer {
    /// Faying faces alone.
    Contact,
    /// Mean of the first plate to mean of the last.
    NodeToNode,
    /// What the joint adds to perfect contact.
    AddedByJoint,
    /// Heated zone to sink surface.
    SourceToSink,
    /// Source to sink when the faces meet perfectly.
    PerfectContact,
    /// Hottest place of the first plate.
    Hottest,
    /// Mean drop across the faying faces.
    InterfaceDrop,
}

impl Answer {
    /// Every answer.
    pub const ALL: [Self; 7] = [
        Self::Contact,
        Self::NodeToNode,
        Self::AddedByJoint,
        Self::SourceToSink,
        Self::PerfectContact,
        Self::Hottest,
        Self::InterfaceDrop,
    ];

    /// The answer of a draw, K/W.
    #[inline]
    pub fn of(self, drawn: &Drawn) -> f64 {
        match self {
            Self::Contact => drawn.contact,
            Self::NodeToNode => drawn.node_to_node,
            Self::AddedByJoint => drawn.added_by_joint,
            Self::SourceToSink => drawn.source_to_sink,
            Self::PerfectContact => drawn.perfect_contact,
            Self::Hottest => drawn.hottest,
            Self::InterfaceDrop => drawn.interface_drop,
        }
    }
}
