//! The answers of a draw that have a band.

use crate::{estimate::Drawn, joint::Joint};

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
    /// Mean of the source above the sink surface under the heat of the draw, by the nominal heat.
    SourceRise,
    /// The same of the hottest place of the first plate.
    HottestRise,
    /// The same of the drop across the faying faces.
    DropRise,
    /// The same from the sink surface to the coolant.
    CoolantDrop,
    /// The same of the mean of the source above the coolant.
    AboveCoolant,
    /// The same of the hottest place above the coolant.
    HottestAboveCoolant,
}

impl Answer {
    /// Every resistance.
    pub const ALL: [Self; 7] = [
        Self::Contact,
        Self::NodeToNode,
        Self::AddedByJoint,
        Self::SourceToSink,
        Self::PerfectContact,
        Self::Hottest,
        Self::InterfaceDrop,
    ];

    /// The temperatures that scatter by themselves where heat or films do.
    const RISES: [Self; 6] = [
        Self::SourceRise,
        Self::HottestRise,
        Self::DropRise,
        Self::CoolantDrop,
        Self::AboveCoolant,
        Self::HottestAboveCoolant,
    ];

    /// What the estimate of a joint asks of its draws.
    pub(super) fn asked(joint: &Joint) -> Vec<Self> {
        let rises = joint.service.heat.is_some() && joint.scatters_heat();
        let rises = if rises { &Self::RISES[..] } else { &[] };
        Self::ALL.iter().chain(rises).copied().collect()
    }

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
            Self::SourceRise => drawn.heat * drawn.source_to_sink,
            Self::HottestRise => drawn.heat * drawn.hottest,
            Self::DropRise => drawn.heat * drawn.interface_drop,
            Self::CoolantDrop => drawn.heat * drawn.coolant_drop,
            Self::AboveCoolant => drawn.heat * (drawn.source_to_sink + drawn.coolant_drop),
            Self::HottestAboveCoolant => drawn.heat * (drawn.hottest + drawn.coolant_drop),
        }
    }
}
