//! `drivers`: which inputs the band comes from, and what to do about them.

use crate::{
    cli::{
        answers::{Answer, Answers, Form, Found},
        batch::Batch,
        chain::{self, Task},
        check,
        console::{Console, Outcome, Trouble},
        draws,
        field::Field,
        figure::Figure,
        output::Permit,
        shown::Shown,
    },
    estimate::Options,
    figures::Drawing,
    joint::Joint,
    report::{self, csv},
    uncertainty::{self, FEWEST_BASES, Ranking, RankingOptions},
    units::System,
};
use clap::{Args, ValueEnum};
use std::path::PathBuf;

const EXAMPLES: &str = "\
Examples:
  ringsum drivers joint.toml
  ringsum drivers joint.toml --of rise --draw drivers.svg";

/// Which inputs the band comes from, ranked, with what knowing each would buy
///
/// Shares of the variance with their 95 % interval, the answer when each input alone goes from its
/// 5 % to its 95 %, and the band that would be left if it were known.
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES)]
pub struct Drivers {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// The answer: source to sink unless told otherwise
    #[arg(
        long,
        value_enum,
        value_name = "source_to_sink|contact|added|node_to_node|rise",
        default_value = "source_to_sink",
        hide_possible_values = true
    )]
    of: Of,
    /// Draws of every band, and base points of the shares
    #[arg(long, value_name = "N", default_value = "16384", value_parser = bases)]
    draws: u32,
    /// Seed of the draws
    #[arg(long, value_name = "N", default_value_t = 1)]
    seed: u64,
    #[command(flatten)]
    field: Field,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    #[command(flatten)]
    shown: Shown,
    /// Print one JSON object per file, in SI
    #[arg(long)]
    json: bool,
    /// Draw the bars of one joint to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    draw: Option<PathBuf>,
    #[command(flatten)]
    batch: Batch,
    /// Write one JSON per file and one table, drivers.csv, to a folder instead of printing
    #[arg(long, value_name = "DIR", conflicts_with = "json")]
    out: Option<PathBuf>,
    /// Replace results and figures that exist
    #[arg(long)]
    force: bool,
}

/// The answer that is looked into.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
#[value(rename_all = "snake_case")]
enum Of {
    /// Heated zone to sink surface
    SourceToSink,
    /// Faying faces alone
    Contact,
    /// What the joint adds
    Added,
    /// Plate to plate
    NodeToNode,
    /// Temperature of the source above the sink
    Rise,
}

/// More base points than this take minutes and tell nothing new.
const MOST: u32 = 1_000_000;

/// A number of base points that tells a confidence.
fn bases(text: &str) -> Result<u32, String> {
    match draws::number(text) {
        Some(count) if (FEWEST_BASES..=MOST).contains(&count) => Ok(count),
        _ => Err(format!(
            "draws are from {FEWEST_BASES} to {MOST}, such as 16384 or 1e5; fewer tell no confidence"
        )),
    }
}

impl Of {
    fn target(self) -> uncertainty::Target {
        match self {
            Self::SourceToSink => uncertainty::Target::SourceToSink,
            Self::Contact => uncertainty::Target::Contact,
            Self::Added => uncertainty::Target::AddedByJoint,
            Self::NodeToNode => uncertainty::Target::NodeToNode,
            Self::Rise => uncertainty::Target::Rise,
        }
    }
}

impl Drivers {
    /// Ranks the inputs of every file; checks every target before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let units = self.shown.system();
        let permit = Permit::new(self.force, &self.files);
        let figure = Figure::of_one(self.draw.as_deref(), self.files.len(), (permit, units))?;
        if figure.is_some() {
            console.outlast_reader();
        }
        let form = Form {
            json: self.json,
            table: &csv::DRIVERS,
            out: self.out.as_deref().map(|folder| (folder, permit)),
        };
        Answers::new(&self.batch, &self.files, &form)?.run(
            console,
            &|path, console| check::read(path, &self.sets, console),
            &|(_, joint), console| {
                let found = self.found(joint)?;
                let written = figure.as_ref().map_or(Ok(()), |figure| {
                    figure.write(&Drawing::Tornado(Box::new(found.clone())), console)
                });
                let answer = Box::new(Told { found, units });
                let unwritten = written.err().into_iter().collect();
                Ok(Found { answer, unwritten })
            },
        )
    }

    fn found(&self, joint: &Joint) -> Result<Ranking, Trouble> {
        if self.of == Of::Rise && joint.service.heat.is_none() {
            return Err(Trouble::usage(
                "--of rise needs the heat, and this joint states none",
                "state [service] heat = \"20 W\", or take --of source_to_sink",
            ));
        }
        let options = RankingOptions {
            target: self.of.target(),
            draws: Options {
                draws: self.draws,
                seed: self.seed,
            },
        };
        let task = Task {
            joint,
            choice: self.field.choice()?,
            watch: self.batch.watch(),
        };
        chain::ranking(&task, &options)
    }
}

/// What is told of one joint.
struct Told {
    found: Ranking,
    units: System,
}

impl Answer for Told {
    fn text(&self) -> String {
        report::drivers::text_in(&self.found, self.units)
    }

    fn object(&self) -> serde_json::Value {
        report::drivers::json(&self.found)
    }

    fn rows(&self) -> Vec<Vec<String>> {
        csv::drivers(&self.found)
    }
}
