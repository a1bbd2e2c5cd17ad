//! `estimate`: joint files to thermal resistance, with the planes of every number.

use crate::{
    cli::{
        answers::{Answer, Answers, Form, Found},
        batch::Batch,
        chain::{self, Beside, Choice, Estimated, Rings, Task},
        check,
        console::{Console, Outcome, Trouble},
        draws::Draws,
        field::Field,
        output::{Permit, Target},
        shown::Shown,
    },
    joint::Joint,
    report::{
        csv, json, media,
        text::{self, Detail},
    },
};
use clap::Args;
use std::path::PathBuf;

const EXAMPLES: &str = "\
Examples:
  ringsum estimate joint.toml
  ringsum estimate joint.toml --set 'fastener.torque.value=\"2 N·m\"'
  ringsum estimate joints/*.toml --json --strict
  ringsum estimate joint.toml --without 3
  ringsum estimate joints/*.toml --jobs 4 --out results";

/// Thermal resistance of joints: low, nominal and high, with the planes of every number
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a flag of its own on the command line"
)]
pub struct Estimate {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    #[command(flatten)]
    field: Field,
    #[command(flatten)]
    draws: Draws,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Shorter: count the assumptions, name the lesser cautions by code
    #[arg(long, conflicts_with = "json")]
    brief: bool,
    /// Longer: every caution in full, every assumption with its reason
    #[arg(long, conflicts_with_all = ["brief", "json"])]
    full: bool,
    /// Add the rings around every bolt
    #[arg(long)]
    rings: bool,
    /// Interface of the rings, counted from 1 at the warm side
    #[arg(long, value_name = "N", default_value_t = 1, requires = "rings")]
    interface: usize,
    /// Add a table of the same joint in media: vacuum,air,helium
    #[arg(long, value_name = "MEDIA", value_delimiter = ',', value_parser = chain::medium)]
    media: Vec<String>,
    /// Solve N draws one by one and tell how far the surfaces of the draws are off; takes its time
    #[arg(long, value_name = "N", default_value_t = 0, hide_default_value = true,
          value_parser = clap::value_parser!(u32).range(..=1000))]
    verify: u32,
    #[command(flatten)]
    shown: Shown,
    /// Print one JSON object per file, in SI
    #[arg(long)]
    json: bool,
    /// Exit with 3 when a caution speaks of this joint
    #[arg(long)]
    strict: bool,
    /// Take a variant of the joint by its name
    #[arg(long, value_name = "NAME")]
    variant: Option<String>,
    /// Leave bolts out, by their numbers: 3 or 3,4; their holes stay
    #[arg(long, value_name = "N", value_delimiter = ',')]
    without: Vec<usize>,
    #[command(flatten)]
    batch: Batch,
    /// Write one JSON per file and one table, estimates.csv, to a folder instead of printing
    #[arg(long, value_name = "DIR", conflicts_with_all = ["json", "brief", "full"], group = "written")]
    out: Option<PathBuf>,
    /// Write the joint as nodes and the conductances between them, W/K, to a table
    #[arg(long, value_name = "FILE.csv", group = "written")]
    nodes: Option<PathBuf>,
    /// Replace results that exist
    #[arg(long, requires = "written")]
    force: bool,
}

impl Estimate {
    /// Estimates every file, also after one at fault.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        if let Some(twice) = chain::twice(&self.media) {
            return Err(Trouble::usage(
                format!("`{twice}` is named twice in --media"),
                "name each medium once",
            ));
        }
        let permit = Permit::new(self.force, &self.files);
        let form = Form {
            json: self.json,
            table: &csv::ESTIMATES,
            out: self.out.as_deref().map(|folder| (folder, permit)),
        };
        let nodes = self.nodes_target(permit)?;
        if nodes.is_some() {
            console.outlast_reader();
        }
        let variant = self.variant.as_deref();
        Answers::new(&self.batch, &self.files, &form)?.run(
            console,
            &|path, console| check::read_variant(path, (&self.sets, variant), console),
            &|(source, joint), console| {
                nodes
                    .as_ref()
                    .map_or(Ok(()), |target| target.apart(&source.tables))?;
                let found = self.found(joint)?;
                let written = nodes.as_ref().map_or(Ok(()), |target| {
                    let table = csv::nodes(&found.estimate).map_err(Trouble::Failure)?;
                    target.write(table.as_bytes())?;
                    console.wrote(&target.path);
                    Ok(())
                });
                let answer = Box::new(Told {
                    asked: &self,
                    found,
                    joint: joint.clone(),
                });
                let unwritten = written.err().into_iter().collect();
                Ok(Found { answer, unwritten })
            },
        )
    }

    /// The table of nodes, of one joint.
    fn nodes_target(&self, permit: Permit) -> Result<Option<Target>, Trouble> {
        let Some(path) = &self.nodes else {
            return Ok(None);
        };
        if self.files.len() > 1 {
            return Err(Trouble::usage(
                format!(
                    "--nodes writes one joint, and {} are named",
                    self.files.len()
                ),
                "write them one by one, or leave --nodes out",
            ));
        }
        let target = permit.target(path)?;
        if matches!(self.field.choice()?, Choice::Cone) {
            return Err(Trouble::usage(
                "the closed form solves no means of the plates, so that it has no nodes",
                "leave out --field cone",
            ));
        }
        Ok(Some(target))
    }

    /// The estimate of a joint and what was asked for beside it.
    fn found(&self, joint: &Joint) -> Result<Estimated, Trouble> {
        let joint = chain::without(joint, &self.without)?;
        let task = Task {
            joint: &joint,
            choice: self.field.choice()?,
            watch: self.batch.watch(),
        };
        let rings = if self.rings {
            Rings::Told(chain::interface(&joint, self.interface)?)
        } else {
            Rings::Left
        };
        let media = chain::media(&joint, &self.media);
        let beside = Beside {
            rings,
            media: &media,
            verify: self.verify,
        };
        chain::estimate(&task, &self.draws.options(), &beside)
    }

    fn object(&self, found: &Estimated) -> serde_json::Value {
        let mut object = json::estimate(&found.estimate);
        if let Some(variant) = &self.variant {
            object["variant"] = variant.as_str().into();
        }
        if self.rings {
            object["rings"] = json::rings(&found.rings);
        }
        if !self.media.is_empty() {
            object["media"] = json::media(&found.media);
        }
        if self.verify > 0 {
            object["verification"] = json::verification(found.verified.as_ref());
        }
        object
    }

    fn text(&self, found: &Estimated) -> String {
        let (estimate, rings) = (&found.estimate, &found.rings);
        let units = self.shown.system();
        let detail = match (self.brief, self.full) {
            (true, _) => Detail::Brief,
            (false, true) => Detail::Full,
            (false, false) => Detail::Screen,
        };
        let mut report = text::painted(&text::estimate_in(estimate, detail, units));
        if let Some(case) = estimate.cases.first().filter(|_| !found.media.is_empty()) {
            report.push('\n');
            report.push_str(&media::table(&found.media, case.name, units));
        }
        if self.verify > 0 {
            report.push_str(&text::verification(found.verified.as_ref()));
        }
        report.push_str(&text::rings(rings, units));
        report.push_str(&text::ring_sum(estimate, rings));
        report
    }
}

/// What is told of one joint.
struct Told<'a> {
    asked: &'a Estimate,
    found: Estimated,
    joint: Joint,
}

impl Answer for Told<'_> {
    fn text(&self) -> String {
        self.asked.text(&self.found)
    }

    fn object(&self) -> serde_json::Value {
        self.asked.object(&self.found)
    }

    fn rows(&self) -> Vec<Vec<String>> {
        csv::estimates(&self.found.estimate, &self.joint.mass())
    }

    fn outcome(&self) -> Outcome {
        if self.asked.strict && self.found.estimate.has_cautions() {
            Outcome::Cautioned
        } else {
            Outcome::Done
        }
    }
}
