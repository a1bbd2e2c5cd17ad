//! `torque`: resistance against torque, and the window that strength allows.

use crate::{
    cli::{
        chain::{self, Task},
        check,
        console::{Console, Layout, Outcome, Trouble},
        draws::Draws,
        field::{self, Field},
        output::{self, Existing, Target},
    },
    figures::Drawing,
    report::{json, sweep},
    uncertainty::{CONFIDENCE, SweepOptions},
};
use clap::Args;
use std::path::PathBuf;

/// Resistance against torque, with the torque that strength allows
#[derive(Debug, Args)]
pub struct Torque {
    /// Joint file; - reads standard input
    file: PathBuf,
    /// Lowest torque, with its unit: "0.5 N·m"
    #[arg(long, value_name = "TORQUE", value_parser = chain::torque)]
    from: Option<f64>,
    /// Highest torque, with its unit
    #[arg(long, value_name = "TORQUE", value_parser = chain::torque)]
    to: Option<f64>,
    /// Number of torques
    #[arg(long, value_name = "N", default_value_t = 13,
          value_parser = clap::value_parser!(u32).range(2..=1000))]
    steps: u32,
    /// Fastener group whose torque is varied, counted from 1 in file order
    #[arg(long, value_name = "N", default_value_t = 1,
          value_parser = clap::value_parser!(u32).range(1..))]
    group: u32,
    /// Share of the draws that the band holds and the window rests on: "90 %" is from 5 % to 95 %
    #[arg(long, value_name = "SHARE", value_parser = chain::confidence)]
    confidence: Option<f64>,
    #[command(flatten)]
    field: Field,
    #[command(flatten)]
    draws: Draws,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Print JSON, in SI
    #[arg(long)]
    json: bool,
    /// Draw the curve to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    out: Option<PathBuf>,
    /// Replace the figure if it exists
    #[arg(long)]
    force: bool,
}

impl Torque {
    /// Sweeps the torque; checks the target of the figure before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        if let (Some(from), Some(to)) = (self.from, self.to)
            && from >= to
        {
            return Err(Trouble::usage(
                "--from must be less than --to",
                "swap the two torques",
            ));
        }
        let figure = match &self.out {
            Some(path) => Some((
                output::format(path)?,
                Target::new(path, Existing::from_force(self.force))?,
            )),
            None => None,
        };
        let (_, joint) =
            check::read(&self.file, &self.sets, console).map_err(|refused| refused.trouble())?;
        let groups = joint.fasteners.len();
        if self.group as usize > groups {
            return Err(Trouble::usage(
                format!(
                    "there is no fastener group {}; the joint has {groups}",
                    self.group
                ),
                "count the [fastener] tables from 1",
            ));
        }
        let options = SweepOptions {
            group: self.group as usize - 1,
            from: self.from,
            to: self.to,
            steps: self.steps as usize,
            confidence: self.confidence.unwrap_or(CONFIDENCE),
            chain: self.draws.options(),
        };
        let task = Task {
            joint: &joint,
            choice: self.field.choice()?,
            watch: field::watch(),
        };
        let found = chain::torque_sweep(&task, &options)?;
        if let Some((format, target)) = figure {
            target.write(&chain::render(
                &Drawing::Torque(Box::new(found.clone())),
                format,
            )?)?;
            console.message(&format!("wrote {}\n", target.path.display()));
        }
        if self.json {
            console.json(&json::torque(&found), Layout::Indented)?;
        } else {
            console.result(&sweep::torque(&found))?;
        }
        Ok(Outcome::Done)
    }
}
