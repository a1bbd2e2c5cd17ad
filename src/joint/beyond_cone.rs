//! What a joint states that the closed-form pressure cone cannot carry.

use crate::joint::{Compliance, FaceFriction, HeadModel, Joint, Outline, Plate, Sag, What};

impl Joint {
    /// Fields of the file that need the elastic solution of the whole joint, each with the reason.
    ///
    /// A bow is not among them: the cone passes over it with a caution. A spread of its height is: the
    /// draws could not honour it.
    ///
    /// Checked: `a_plain_joint_needs_no_elastic_field`, `each_field_beyond_the_cone_is_named`.
    pub fn needs_elastic(&self) -> Vec<(String, &'static str)> {
        let mut needs = Vec::new();
        if self.plates.len() > 2 {
            needs.push((
                "plate".into(),
                "the cone knows two plates, and these are more",
            ));
        }
        for (index, plate) in self.plates.iter().enumerate() {
            let field = |key: &str| format!("plate.{}.{key}", plate.name);
            let stated = [
                (
                    matches!(plate.outline, Outline::Polygon { .. }),
                    "outline",
                    "closed forms know rectangles and discs",
                ),
                (
                    !plate.cutouts.is_empty(),
                    "cutouts",
                    "closed forms know plates without openings",
                ),
                (
                    plate.feet.is_some(),
                    "feet",
                    "the cone takes the whole faces as one land",
                ),
                (
                    !plate.ribs.is_empty(),
                    "ribs",
                    "the cone takes plates of one thickness",
                ),
                (
                    plate.sandwich.is_some(),
                    "sandwich",
                    "closed forms know solid plates",
                ),
                (
                    plate.flatness_map.is_some(),
                    "flatness_map",
                    "the cone takes faces as flat",
                ),
                (
                    plate
                        .sag
                        .as_ref()
                        .is_some_and(|sag| *sag != Sag::Curvature(0.0)),
                    "sag",
                    "the cone takes faces as flat",
                ),
                (
                    self.spread_of(What::Bow(index)).is_some(),
                    "bow.height",
                    "the cone takes faces as flat, so that no spread of the height can move it",
                ),
                (
                    self.spreads_flatness(index),
                    "finish.flatness",
                    "the cone takes faces as flat, so that no spread of the height can move it",
                ),
                (
                    plate.material.through.is_some(),
                    "conductivity",
                    "closed forms know one conductivity per plate",
                ),
            ];
            for (_, key, why) in stated.into_iter().filter(|(is_stated, ..)| *is_stated) {
                needs.push((field(key), why));
            }
        }
        if !self.is_flush() {
            needs.push((
                "fastener.engagement.proud".into(),
                "the cone takes faces that meet",
            ));
        }
        let field = |plate: &Plate, key: &str| format!("plate.{}.{key}", plate.name);
        if self.source.alone().is_none() {
            needs.push((
                field(self.warm(), "heated"),
                "closed forms know one heated zone",
            ));
        }
        if self.sink.alone().is_none() {
            needs.push((
                field(self.cold(), "cooled"),
                "closed forms know one film or temperature on the whole back, or a round rim",
            ));
        }
        if self.contact.head_model == HeadModel::Rigid {
            needs.push(("contact.head_model".into(), "the cone has uniform heads"));
        }
        if self.contact.faces == FaceFriction::Stuck {
            needs.push(("contact.faces".into(), "in the cone faces slide freely"));
        }
        if self.contact.compliance == Compliance::Asperities {
            needs.push(("contact.compliance".into(), "in the cone contact is hard"));
        }
        needs
    }
}

#[cfg(test)]
mod tests {
    use std::sync::Arc;

    use super::*;
    use crate::joint::{
        CooledPart, Cooling, Edge, Feet, Flange, FlatnessMap, Heating, Patch, Rib, Sandwich,
        fixture,
    };

    #[test]
    fn a_plain_joint_needs_no_elastic_field() {
        let mut joint = fixture::joint();
        joint.plates[0].bow = Some(30e-6);
        assert!(joint.needs_elastic().is_empty());
    }

    #[test]
    fn each_field_beyond_the_cone_is_named() {
        let mut joint = fixture::joint();
        let patch = Patch::Disc {
            centre: [0.02, 0.03],
            radius: 0.01,
        };
        let [upper, lower] = joint.plates.as_mut_slice() else {
            panic!("two plates");
        };
        upper.outline = Outline::Polygon {
            points: [[0.0, 0.0], [0.1, 0.0], [0.0, 0.1]].into(),
        };
        upper.cutouts = vec![patch.clone()];
        upper.feet = Some(Feet {
            height: 1e-3,
            at: vec![patch.clone()],
        });
        upper.flatness_map =
            FlatnessMap::new(vec![[0.0, 0.0, 0.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0]]).map(Arc::new);
        lower.sandwich = Some(Sandwich {
            face_sheet: 1e-3,
            core_conductivity: 1.0,
            core_modulus: 1e9,
            insert: lower.material.clone(),
        });
        joint.fasteners[0].flange = Some(Flange {
            radius: 6e-3,
            proud: 1e-4,
        });
        lower.ribs = vec![Rib {
            patch,
            height: 1e-3,
        }];
        lower.sag = Some(Sag::Flux(1e3));
        lower.material.through = Some(lower.material.conductivity.clone());
        joint.source = Heating::Several(Vec::new());
        joint.sink = Cooling::Parts(vec![CooledPart::Edge(Edge::Left)]);
        joint.contact.head_model = HeadModel::Rigid;
        joint.contact.faces = FaceFriction::Stuck;
        joint.contact.compliance = Compliance::Asperities;
        let fields: Vec<String> = joint
            .needs_elastic()
            .into_iter()
            .map(|need| need.0)
            .collect();
        assert_eq!(
            fields,
            [
                "plate.box.outline",
                "plate.box.cutouts",
                "plate.box.feet",
                "plate.box.flatness_map",
                "plate.panel.ribs",
                "plate.panel.sandwich",
                "plate.panel.sag",
                "plate.panel.conductivity",
                "fastener.engagement.proud",
                "plate.box.heated",
                "plate.panel.cooled",
                "contact.head_model",
                "contact.faces",
                "contact.compliance",
            ]
        );
    }
}
