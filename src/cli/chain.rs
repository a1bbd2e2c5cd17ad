//! The one place where commands meet the chain: reading a joint, estimating it, drawing it.

use crate::{
    cli::console::Trouble,
    diagnostic,
    estimate::{
        self, BEYOND_CONE, Chain, Estimate, Failure, FieldMap, Options, RingRow, TorqueSweep,
    },
    figures::{self, Drawing, Format},
    joint::Joint,
    uncertainty::{self, SweepOptions},
    units::{self, Quantity},
};

/// Low, nominal and high of a joint.
pub fn estimate(joint: &Joint, options: &Options) -> Result<Estimate, Trouble> {
    Ok(uncertainty::estimate(joint, options)?)
}

/// The torque of one group swept.
pub fn torque_sweep(joint: &Joint, options: &SweepOptions) -> Result<TorqueSweep, Trouble> {
    Ok(uncertainty::torque_sweep(joint, options)?)
}

/// An estimate with the rings of every bolt.
pub fn with_rings(
    joint: &Joint,
    options: &Options,
) -> Result<(Estimate, Vec<Vec<RingRow>>), Trouble> {
    let chain = Chain::new(joint)?;
    let found = uncertainty::along(&chain, options)?;
    Ok((found, estimate::ring_tables(&chain)?))
}

/// What the figures show: nominal results, fields over the plan, rings of every bolt.
pub fn fields(
    joint: &Joint,
    columns: usize,
) -> Result<(Estimate, FieldMap, Vec<Vec<RingRow>>), Trouble> {
    let chain = Chain::new(joint)?;
    let nominal = uncertainty::along(&chain, &Options { draws: 0, seed: 1 })?;
    Ok((
        nominal,
        estimate::field_map(&chain, columns)?,
        estimate::ring_tables(&chain)?,
    ))
}

impl From<Failure> for Trouble {
    fn from(failure: Failure) -> Self {
        match failure {
            // The joint is sound; what was asked of it is not.
            Failure::NoSuchGroup { .. }
            | Failure::NotByTorque { .. }
            | Failure::SweepRange { .. } => Self::Usage {
                message: failure.to_string(),
                help: None,
            },
            Failure::BeyondCone(_) => Self::Usage {
                message: failure.to_string(),
                help: Some(format!(
                    "estimate it with `--field elastic`; `ringsum explain {BEYOND_CONE}` tells more"
                )),
            },
            _ => Self::Failure(failure.to_string()),
        }
    }
}

/// A torque from the command line, N m.
pub fn torque(text: &str) -> Result<f64, String> {
    units::parse(text, Quantity::Torque).map_err(|fault| match fault.help {
        Some(help) => format!("{}; {help}", fault.message),
        None => fault.message,
    })
}

/// The name that was probably meant.
pub fn nearest(name: &str, known: &[String]) -> Option<String> {
    diagnostic::nearest(name, known.iter().map(String::as_str))
}

/// A drawing as a file of the format.
pub fn render(drawing: &Drawing, format: Format) -> Result<Vec<u8>, Trouble> {
    figures::render(drawing, format).map_err(|fault| Trouble::Failure(fault.to_string()))
}
