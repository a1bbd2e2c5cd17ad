//! The one place where commands meet the chain: reading a joint, estimating it, drawing it.

use crate::{
    cli::console::Trouble,
    diagnostic,
    estimate::{self, Estimate, Failure, FieldMap, Options, RingRow, TorqueSweep},
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

/// Pressure and conductance over the plan.
pub fn field_map(joint: &Joint, columns: usize) -> Result<FieldMap, Trouble> {
    Ok(estimate::field_map(joint, columns)?)
}

/// The rings of every bolt.
pub fn ring_tables(joint: &Joint) -> Result<Vec<Vec<RingRow>>, Trouble> {
    Ok(estimate::ring_tables(joint)?)
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
