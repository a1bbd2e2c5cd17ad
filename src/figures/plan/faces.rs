//! Temperatures of both faying faces over the same plan and on one scale; flux between them.

use crate::{
    estimate::{FieldMap, HeatMap},
    figures::{
        FigureError,
        axis::significant,
        drawable,
        plan::{PlanMap, Scale, pair::together},
        ramp::Ramp,
        setting::Setting,
        sheet::Sheet,
        warmth::{told, unit},
    },
};

/// Temperatures of the warm and the cold face.
#[derive(Clone, Debug, PartialEq)]
pub struct FacePair {
    /// The warm face, whose title stands for both.
    pub warm: PlanMap,
    /// The cold face.
    pub cold: PlanMap,
    /// Heat for which they are told, W; per watt when none.
    pub heat: Option<f64>,
}

impl FacePair {
    /// Both faces of a solved heat, at a heat or per watt; the field brings the edge of contact.
    ///
    /// Plates, bolts and heated zone are yet to be filled in, by [`FacePair::furnished`].
    pub fn of(
        title: &str,
        (field, map): (&FieldMap, &HeatMap),
        (names, heat): ([&str; 2], Option<f64>),
    ) -> Self {
        let values = || map.rises.iter().flatten().copied();
        // A comparison with NaN keeps the other side.
        let ends = [
            values().fold(f64::INFINITY, f64::min),
            values().fold(f64::NEG_INFINITY, f64::max),
        ];
        let face = |index: usize| PlanMap {
            window: map.window,
            size: map.size,
            values: map.rises[index].clone(),
            quantity: format!("face of {}", names[index]),
            unit: unit(heat).into(),
            factor: heat.unwrap_or(1.0),
            scale: Scale::Between(ends),
            ramp: Ramp::Ember,
            ..PlanMap::pressure(title, field)
        };
        Self {
            warm: face(0),
            cold: face(1),
            heat,
        }
    }

    /// The same change to both maps.
    #[must_use]
    pub fn furnished(self, furnish: impl Fn(PlanMap) -> PlanMap) -> Self {
        Self {
            warm: furnish(self.warm),
            cold: furnish(self.cold),
            heat: self.heat,
        }
    }
}

impl PlanMap {
    /// The heat flux across the interface over its mean, over decades; plates, bolts and heated
    /// zone are yet to be filled in.
    pub fn flux(title: &str, (field, map): (&FieldMap, &HeatMap)) -> Self {
        Self {
            window: map.window,
            size: map.size,
            values: map.concentration.clone(),
            quantity: "heat flux across the faces".into(),
            unit: "× its mean".into(),
            factor: 1.0,
            scale: Scale::TwoDecades,
            ..Self::pressure(title, field)
        }
    }
}

/// Draws the pair.
pub(in crate::figures) fn draw(pair: &FacePair, setting: Setting) -> Result<Sheet, FigureError> {
    let maps = [&pair.warm, &pair.cold];
    let range = match pair.warm.scale {
        Scale::Between(ends) => {
            let [low, high] = ends.map(|end| drawable(end * pair.warm.factor, "the field"));
            format!(
                ", {} to {} {}",
                significant(low?, 3),
                significant(high?, 3),
                unit(pair.heat)
            )
        }
        _ => String::new(),
    };
    together(&maps, &format!("{}{range}", told(pair.heat)), setting)
}
