//! The one place where commands meet the chain: reading a joint, estimating it, drawing it.

pub use crate::estimate::{Choice, Fineness, Watch};

use crate::{
    cli::console::Trouble,
    diagnostic,
    estimate::{
        self, BEYOND_CONE, Chain, Estimate, Failure, FieldMap, HeatMap, Options, RingRow,
        StackSection, TorqueSweep,
    },
    figures::{self, Drawing, Format},
    joint::Joint,
    pressure::elastic::Failure as Contact,
    uncertainty::{self, SweepOptions},
    units::{self, Quantity},
};

/// A joint, the field it is to stand on, and who is told while it is solved.
#[derive(Clone, Debug)]
pub struct Task<'a> {
    /// The joint.
    pub joint: &'a Joint,
    /// The field.
    pub choice: Choice,
    /// Whom to tell.
    pub watch: Watch,
}

impl<'a> Task<'a> {
    fn chain(&self) -> Result<Chain<'a>, Trouble> {
        let chain = Chain::of(self.joint, self.choice, &self.watch);
        self.watch.tell("");
        Ok(chain?)
    }

    /// Does the work and ends the telling.
    fn watched<T>(&self, work: impl FnOnce() -> Result<T, Failure>) -> Result<T, Trouble> {
        let done = work();
        self.watch.tell("");
        Ok(done?)
    }
}

/// Low, nominal and high of a joint.
pub fn estimate(task: &Task, options: &Options) -> Result<Estimate, Trouble> {
    let chain = task.chain()?;
    task.watched(|| uncertainty::along(&chain, options))
}

/// The torque of one group swept.
pub fn torque_sweep(task: &Task, options: &SweepOptions) -> Result<TorqueSweep, Trouble> {
    let chain = task.chain()?;
    task.watched(|| uncertainty::sweep_along(&chain, options))
}

/// An estimate with the rings of every bolt.
pub fn with_rings(
    task: &Task,
    options: &Options,
) -> Result<(Estimate, Vec<Vec<RingRow>>), Trouble> {
    let chain = task.chain()?;
    task.watched(|| {
        let found = uncertainty::along(&chain, options)?;
        Ok((found, estimate::ring_tables(&chain)?))
    })
}

/// What the figures show.
#[derive(Clone, Debug)]
pub struct Fields {
    /// Nominal results.
    pub nominal: Estimate,
    /// Pressure, gap and conductance over the plan.
    pub map: FieldMap,
    /// Rings of every bolt.
    pub rings: Vec<Vec<RingRow>>,
    /// Temperatures of the faces and the flux between them; none for the cone.
    pub heat: Option<HeatMap>,
    /// A cut through the stack; none for the cone.
    pub section: Option<StackSection>,
}

/// What the figures show, maps `columns` points wide.
pub fn fields(task: &Task, columns: usize) -> Result<Fields, Trouble> {
    let chain = task.chain()?;
    task.watched(|| {
        Ok(Fields {
            nominal: uncertainty::along(&chain, &Options { draws: 0, seed: 1 })?,
            map: estimate::field_map(&chain, columns)?,
            rings: estimate::ring_tables(&chain)?,
            heat: estimate::heat_map(&chain, columns)?,
            section: estimate::stack_section(&chain)?,
        })
    })
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
            Failure::Contact(Contact::TooLarge { bytes, .. }) => Self::Usage {
                message: failure.to_string(),
                help: Some(format!(
                    "allow more with `--memory \"{} MB\"`, or take `--resolution fast`",
                    bytes.div_ceil(1_000_000)
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
