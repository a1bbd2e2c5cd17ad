//! `torque`: resistance against torque, and the window that strength allows.

use crate::{
    cli::{
        answers::{Answer, Answers, Form, Found},
        batch::Batch,
        chain::{self, Task},
        check,
        console::{Console, Outcome, Trouble},
        draws::Draws,
        field::Field,
        figure::Figure,
        input::{self, Source},
        output::Permit,
        shown::Shown,
    },
    estimate::TorqueSweep,
    figures::Drawing,
    joint::{self, Joint},
    layout,
    report::{csv, json, sweep},
    uncertainty::{CONFIDENCE, SweepOptions},
    units::System,
};
use clap::Args;
use std::path::PathBuf;

/// Resistance against torque, with the torque that strength allows
#[derive(Debug, Args)]
pub struct Torque {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
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
    #[command(flatten)]
    shown: Shown,
    /// Print one JSON object per file, in SI
    #[arg(long)]
    json: bool,
    /// Draw the curve of one joint to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    draw: Option<PathBuf>,
    #[command(flatten)]
    batch: Batch,
    /// Write one JSON per file and one table, torques.csv, to a folder instead of printing
    #[arg(long, value_name = "DIR", conflicts_with = "json")]
    out: Option<PathBuf>,
    /// Replace results and figures that exist
    #[arg(long)]
    force: bool,
}

impl Torque {
    /// Sweeps the torque of every file; checks every target before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        if let (Some(from), Some(to)) = (self.from, self.to)
            && from >= to
        {
            return Err(Trouble::usage(
                "--from must be less than --to",
                "swap the two torques",
            ));
        }
        let units = self.shown.system();
        let permit = Permit::new(self.force, &self.files);
        let figure = Figure::of_one(self.draw.as_deref(), self.files.len(), (permit, units))?;
        if figure.is_some() {
            console.outlast_reader();
        }
        let form = Form {
            json: self.json,
            table: &csv::TORQUES,
            out: self.out.as_deref().map(|folder| (folder, permit)),
        };
        Answers::new(&self.batch, &self.files, &form)?.run(
            console,
            &|path, console| check::read(path, &self.sets, console),
            &|(source, joint), console| {
                let found = self.found(joint, source)?;
                let written = figure.as_ref().map_or(Ok(()), |figure| {
                    figure.write(&Drawing::Torque(Box::new(found.clone())), console)
                });
                let answer = Box::new(Told { found, units });
                let unwritten = written.err().into_iter().collect();
                Ok(Found { answer, unwritten })
            },
        )
    }

    fn found(&self, joint: &Joint, source: &Source) -> Result<TorqueSweep, Trouble> {
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
            joint,
            choice: self.field.choice()?,
            watch: self.batch.watch(),
        };
        // As `check::read` found it, changed in one thing.
        let folder = &source.folder;
        let again = |text: &str, sets: &[String]| {
            let stated = |set: &String| set.trim_start().starts_with("fastener");
            if text != source.text && self.sets.iter().any(stated) {
                return Err("an override states the fastener: write it into the file".to_owned());
            }
            let sets = [self.sets.as_slice(), sets].concat();
            let files = |name: &str| input::table(folder, name);
            joint::read_with_files(text, &sets, &files).map_err(|told| told.first())
        };
        let group = options.group;
        chain::torque_sweep(&task, &options, &|| {
            layout::alternatives((joint, group), &source.text, &again)
        })
    }
}

/// What is told of one joint.
struct Told {
    found: TorqueSweep,
    units: System,
}

impl Answer for Told {
    fn text(&self) -> String {
        sweep::torque_in(&self.found, self.units)
    }

    fn object(&self) -> serde_json::Value {
        json::torque(&self.found)
    }

    fn rows(&self) -> Vec<Vec<String>> {
        csv::torques(&self.found)
    }
}
