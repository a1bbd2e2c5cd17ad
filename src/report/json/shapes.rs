//! Shapes that many answers of the JSON share.

use schemars::JsonSchema;
use serde::Serialize;

use crate::{
    diagnostic::{Assumption, Caution},
    estimate::Band,
    joint::{Limit, Plane},
    report::json::FORMAT,
};

/// What every answer begins with.
#[derive(Serialize, JsonSchema)]
pub struct Head {
    /// Version of the program
    ringsum: &'static str,
    /// System of units of every number
    #[schemars(extend("const" = "SI"))]
    units: &'static str,
    /// Number of this contract
    #[schemars(extend("const" = FORMAT))]
    format: u32,
}

/// That of this version.
pub const HEAD: Head = Head {
    ringsum: env!("CARGO_PKG_VERSION"),
    units: "SI",
    format: FORMAT,
};

/// Low, nominal and high of one number.
#[derive(Serialize, JsonSchema)]
pub struct Ends {
    /// 5 % quantile of the draws, or where a confidence was asked for the lower end of that; null without
    /// draws
    pub low: Option<f64>,
    /// The value at nominal inputs
    pub nominal: f64,
    /// 95 % quantile of the draws, or where a confidence was asked for the upper end of that; null without
    /// draws
    pub high: Option<f64>,
}

/// Least, nominal and most of a clamp force, N.
#[derive(Serialize, JsonSchema)]
pub struct ForceEnds {
    /// What scatter and losses leave at least; it needs no draws
    pub low: Option<f64>,
    /// The value at nominal inputs
    pub nominal: f64,
    /// What scatter gives at most; it needs no draws
    pub high: Option<f64>,
}

impl From<&Band> for ForceEnds {
    fn from(band: &Band) -> Self {
        let Ends { low, nominal, high } = Ends::from(band);
        Self { low, nominal, high }
    }
}

impl From<&Band> for Ends {
    fn from(band: &Band) -> Self {
        Self {
            low: band.low,
            nominal: band.nominal,
            high: band.high,
        }
    }
}

/// Low, nominal and high of a conductance.
#[derive(Serialize, JsonSchema)]
pub struct ConductanceEnds {
    /// The smaller one; null without draws, and where no finite conductance belongs to the resistance
    pub low: Option<f64>,
    /// The value at nominal inputs; null where no finite conductance belongs to the resistance
    pub nominal: Option<f64>,
    /// The larger one; null without draws, and where no finite conductance belongs to the resistance
    pub high: Option<f64>,
}

impl From<[Option<f64>; 3]> for ConductanceEnds {
    fn from([low, nominal, high]: [Option<f64>; 3]) -> Self {
        Self { low, nominal, high }
    }
}

/// Two ends of one number.
#[derive(Serialize, JsonSchema)]
pub struct LowHigh {
    /// The lower end
    pub low: f64,
    /// The upper end
    pub high: f64,
}

impl From<[f64; 2]> for LowHigh {
    fn from([low, high]: [f64; 2]) -> Self {
        Self { low, high }
    }
}

/// A resistance between two planes.
#[derive(Serialize, JsonSchema)]
pub struct ResistanceEnds {
    /// Resistance, K/W
    pub resistance: Ends,
}

impl From<&Band> for ResistanceEnds {
    fn from(band: &Band) -> Self {
        Self {
            resistance: band.into(),
        }
    }
}

/// Equivalent stress of a bolt over its yield strength at assembly.
#[derive(Serialize, JsonSchema)]
pub struct StrengthUse {
    /// At nominal force, share of 1
    pub nominal: f64,
    /// At the highest force, share of 1
    pub high: f64,
}

impl From<[f64; 2]> for StrengthUse {
    fn from([nominal, high]: [f64; 2]) -> Self {
        Self { nominal, high }
    }
}

/// Something to know when a result is used; the result stands.
#[derive(Serialize, JsonSchema)]
pub struct CautionTold {
    /// Stable code, which `ringsum explain` explains
    pub code: &'static str,
    /// The caution with its numbers
    pub text: String,
}

/// Cautions with their codes.
pub fn cautions(cautions: &[Caution]) -> Vec<CautionTold> {
    let told = cautions.iter().map(|caution| CautionTold {
        code: caution.code,
        text: caution.text.clone(),
    });
    told.collect()
}

/// A value that the joint file does not state.
#[derive(Serialize, JsonSchema)]
pub struct AssumptionTold {
    /// The field that would state it
    pub field: String,
    /// The value taken, with its unit
    pub value: String,
    /// Why that value
    pub why: String,
}

/// What was assumed.
pub fn assumptions(assumptions: &[Assumption]) -> Vec<AssumptionTold> {
    let told = assumptions.iter().map(|each| AssumptionTold {
        field: each.field.clone(),
        value: each.value.clone(),
        why: each.why.clone(),
    });
    told.collect()
}

/// The side of a limit in one word.
pub fn bound(bound: Limit) -> &'static str {
    match bound {
        Limit::Most => "most",
        Limit::Least => "least",
    }
}

/// The key of a result.
pub fn plane_key(plane: Plane) -> &'static str {
    match plane {
        Plane::Contact => "contact",
        Plane::NodeToNode => "node_to_node",
        Plane::AddedByJoint => "added_by_joint",
        Plane::SourceToSink => "source_to_sink",
    }
}
