//! What a solved field leaves open: how heads press, whether faces slide, what yields, which way
//! faces are bent.

use crate::joint::{Compliance, FaceFriction, Facing, HeadModel, Joint};

/// The joint as stated, or with one thing turned into its opposite.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Variant {
    /// As the file has it.
    Stated,
    /// Heads rigid for uniform and the other way round.
    OtherHeads,
    /// Faces stuck for sliding and the other way round.
    OtherFriction,
    /// Asperities that yield for hard contact and the other way round.
    OtherCompliance,
    /// Flat although the file states a bow, a map or a sag; proud inserts stay proud.
    Flat,
    /// Stated flatness, −1 convex to 1 concave.
    Bent(f64),
}

impl Variant {
    pub(super) fn head(self, joint: &Joint) -> HeadModel {
        match (joint.contact.head_model, self) {
            (HeadModel::Uniform, Self::OtherHeads) => HeadModel::Rigid,
            (HeadModel::Rigid, Self::OtherHeads) => HeadModel::Uniform,
            (stated, _) => stated,
        }
    }

    pub(super) fn faces(self, joint: &Joint) -> FaceFriction {
        match (joint.contact.faces, self) {
            (FaceFriction::Frictionless, Self::OtherFriction) => FaceFriction::Stuck,
            (FaceFriction::Stuck, Self::OtherFriction) => FaceFriction::Frictionless,
            (stated, _) => stated,
        }
    }

    pub(super) fn compliance(self, joint: &Joint) -> Compliance {
        match (joint.contact.compliance, self) {
            (Compliance::Hard, Self::OtherCompliance) => Compliance::Asperities,
            (Compliance::Asperities, Self::OtherCompliance) => Compliance::Hard,
            (stated, _) => stated,
        }
    }

    /// Initial gap of the faces of an interface (0 is the warmest) at a point, m; what proud inserts
    /// leave open is no matter of flatness and in every variant.
    pub(super) fn initial_gap(self, (joint, interface): (&Joint, usize), point: [f64; 2]) -> f64 {
        let proud = joint.proud_gap(interface, point);
        let faces = match self {
            Self::Flat => 0.0,
            Self::Bent(place) => {
                let faces = [Facing::Cold, Facing::Warm].into_iter();
                let bent = faces.zip(joint.meeting(interface)).map(|(facing, plate)| {
                    plate.flatness_gap(point, place * plate.loose_flatness(facing))
                });
                joint.initial_gap(interface, point) + bent.sum::<f64>()
            }
            _ => joint.initial_gap(interface, point),
        };
        faces + proud
    }

    /// Whether the faces come together without any gap: flat, and no insert stands out.
    pub(super) fn is_flat(self, joint: &Joint) -> bool {
        let faces = match self {
            Self::Flat => true,
            Self::Bent(place) => joint.is_flat() && place == 0.0,
            _ => joint.is_flat(),
        };
        faces && joint.is_flush()
    }
}
