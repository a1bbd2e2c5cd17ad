//! Temperatures of a solved heat as JSON: per watt, above the mean sink surface.

use crate::estimate::CaseResult;
use serde_json::{Value, json};

/// Null for the cone, which solves no temperatures.
pub(super) fn temperatures(case: &CaseResult) -> Value {
    case.temperatures.as_ref().map_or(Value::Null, |found| {
        let [x, y, height] = found.hottest_at;
        let named = found.names.iter().zip(&found.plate_means);
        json!({
            "hottest": {
                "plate": found.names.first(),
                "at": [x, y],
                "height": height,
                "per_watt": found.hottest,
            },
            "plates": named
                .map(|(name, mean)| json!({ "plate": name, "mean_per_watt": mean }))
                .collect::<Value>(),
            "interface_drops_per_watt": found.interface_drops,
        })
    })
}
