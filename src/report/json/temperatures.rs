//! Temperatures of a solved heat as JSON: per watt, above the mean sink surface.

use schemars::JsonSchema;
use serde::Serialize;

use crate::estimate::CaseResult;

/// Temperatures of a solved heat, per watt above the mean sink surface.
#[derive(Serialize, JsonSchema)]
pub struct TemperaturesTold {
    /// Hottest point of the first plate
    hottest: HottestTold,
    /// Means of the plates, the warm one first
    plates: Vec<PlateMean>,
    /// Mean drops across the interfaces, from warm to cold, K/W
    interface_drops_per_watt: Vec<f64>,
}

/// The hottest point.
#[derive(Serialize, JsonSchema)]
struct HottestTold {
    /// Name of its plate; null where none is named
    plate: Option<String>,
    /// Place in the coordinates of the plate, m
    at: [f64; 2],
    /// Height above the lowest face of the plate, m
    height: f64,
    /// Rise per watt, K/W
    per_watt: f64,
}

/// The volume mean of a plate.
#[derive(Serialize, JsonSchema)]
struct PlateMean {
    /// Name of the plate
    plate: String,
    /// Mean rise per watt, K/W
    mean_per_watt: f64,
}

/// None for the cone, which solves no temperatures.
pub(super) fn temperatures(case: &CaseResult) -> Option<TemperaturesTold> {
    let found = case.temperatures.as_ref()?;
    let [x, y, height] = found.hottest_at;
    let named = found.names.iter().zip(&found.plate_means);
    Some(TemperaturesTold {
        hottest: HottestTold {
            plate: found.names.first().cloned(),
            at: [x, y],
            height,
            per_watt: found.hottest,
        },
        plates: named
            .map(|(name, mean)| PlateMean {
                plate: name.clone(),
                mean_per_watt: *mean,
            })
            .collect(),
        interface_drops_per_watt: found.interface_drops.clone(),
    })
}
