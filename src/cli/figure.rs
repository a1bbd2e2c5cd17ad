//! A figure asked for beside an answer: where it goes, in which format and units.

use crate::{
    cli::{
        chain,
        console::{Console, Trouble},
        output::{self, Permit, Target},
    },
    figures::{Drawing, Format},
    units::System,
};
use std::path::Path;

/// A figure to be written, checked before anything is computed.
#[derive(Debug)]
pub struct Figure {
    format: Format,
    target: Target,
    units: System,
}

impl Figure {
    /// The figure that `--draw` names.
    pub fn asked(
        path: Option<&Path>,
        (permit, units): (Permit, System),
    ) -> Result<Option<Self>, Trouble> {
        let Some(path) = path else { return Ok(None) };
        Ok(Some(Self {
            format: output::format(path)?,
            target: permit.target(path)?,
            units,
        }))
    }

    /// The same where it shows one input: of several none is drawn.
    pub fn of_one(
        path: Option<&Path>,
        inputs: usize,
        how: (Permit, System),
    ) -> Result<Option<Self>, Trouble> {
        if path.is_some() && inputs > 1 {
            return Err(Trouble::usage(
                format!("--draw draws one joint, and {inputs} are named"),
                "draw them one by one, or leave --draw out",
            ));
        }
        Self::asked(path, how)
    }

    /// Draws it into its file and tells so.
    pub fn write(&self, drawing: &Drawing, console: &mut Console) -> Result<(), Trouble> {
        let bytes = chain::render(drawing, self.format, self.units)?;
        self.target.write(&bytes)?;
        console.wrote(&self.target.path);
        Ok(())
    }
}
