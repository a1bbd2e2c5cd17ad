//! `estimate`: joint files to thermal resistance, with the planes of every number.

use crate::{
    cli::{
        chain::{self, Beside, Estimated, Rings, Task},
        check,
        console::{Console, Layout, Outcome, Trouble},
        draws::Draws,
        field::{self, Field},
        input,
    },
    report::{
        json, media,
        text::{self, Detail},
    },
};
use clap::Args;
use std::path::{Path, PathBuf};

const EXAMPLES: &str = "\
Examples:
  ringsum estimate joint.toml
  ringsum estimate joint.toml --set 'fastener.torque.value=\"2 N·m\"'
  ringsum estimate joints/*.toml --json --strict";

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
    #[arg(long)]
    brief: bool,
    /// Longer: every caution in full, every assumption with its reason
    #[arg(long, conflicts_with = "brief")]
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
    /// Print one JSON object per file, in SI
    #[arg(long)]
    json: bool,
    /// Exit with 3 when a caution speaks of this joint
    #[arg(long)]
    strict: bool,
}

impl Estimate {
    /// Estimates every file, also after one at fault.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        input::stdin_at_most_once(&self.files)?;
        if let Some(twice) = chain::twice(&self.media) {
            return Err(Trouble::usage(
                format!("`{twice}` is named twice in --media"),
                "name each medium once",
            ));
        }
        let mut outcomes = Vec::new();
        for (index, path) in self.files.iter().enumerate() {
            if !self.json && self.files.len() > 1 {
                let gap = if index > 0 { "\n" } else { "" };
                console.result(&format!("{gap}{}:\n", input::name(path)))?;
            }
            outcomes.push(match self.one(path, console) {
                Ok(outcome) => outcome,
                Err(Trouble::Output(fault)) => return Err(Trouble::Output(fault)),
                Err(trouble) => {
                    console.trouble(&trouble);
                    trouble.outcome()
                }
            });
        }
        Ok(Outcome::of_batch(&outcomes))
    }

    fn one(&self, path: &Path, console: &mut Console) -> Result<Outcome, Trouble> {
        let layout = Layout::of_batch(self.files.len());
        let (source, joint) = match check::read(path, &self.sets, console) {
            Ok(read) => read,
            Err(refused) => {
                if self.json {
                    console.json(&refused.json(), layout)?;
                }
                return Err(refused.trouble());
            }
        };
        let options = self.draws.options();
        let task = Task {
            joint: &joint,
            choice: self.field.choice()?,
            watch: field::watch(),
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
        match chain::estimate(&task, &options, &beside) {
            Ok(found) => {
                self.tell(&source.name, &found, console)?;
                Ok(if self.strict && found.estimate.has_cautions() {
                    Outcome::Cautioned
                } else {
                    Outcome::Done
                })
            }
            Err(Trouble::Failure(message)) => {
                if self.json {
                    let object = serde_json::json!({
                        "file": source.name, "ok": false, "failure": message,
                    });
                    console.json(&object, layout)?;
                }
                Err(Trouble::Failure(format!("{}: {message}", source.name)))
            }
            Err(Trouble::Usage { message, help }) => {
                if self.json {
                    let object = serde_json::json!({
                        "file": source.name, "ok": false, "failure": message,
                    });
                    console.json(&object, layout)?;
                }
                Err(Trouble::Usage {
                    message: format!("{}: {message}", source.name),
                    help,
                })
            }
            Err(trouble) => Err(trouble),
        }
    }

    fn tell(&self, name: &str, found: &Estimated, console: &mut Console) -> Result<(), Trouble> {
        let (estimate, rings) = (&found.estimate, &found.rings);
        if self.json {
            let mut object = json::estimate(estimate);
            object["file"] = name.into();
            if self.rings {
                object["rings"] = json::rings(rings);
            }
            if !self.media.is_empty() {
                object["media"] = json::media(&found.media);
            }
            if self.verify > 0 {
                object["verification"] = json::verification(found.verified.as_ref());
            }
            console.json(&object, Layout::of_batch(self.files.len()))?;
            return Ok(());
        }
        let detail = match (self.brief, self.full) {
            (true, _) => Detail::Brief,
            (false, true) => Detail::Full,
            (false, false) => Detail::Screen,
        };
        let mut report = text::painted(&text::estimate_at(estimate, detail));
        if let Some(case) = estimate.cases.first().filter(|_| !found.media.is_empty()) {
            report.push('\n');
            report.push_str(&media::table(&found.media, case.name));
        }
        if self.verify > 0 {
            report.push_str(&text::verification(found.verified.as_ref()));
        }
        report.push_str(&text::rings(rings));
        report.push_str(&text::ring_sum(estimate, rings));
        console.result(&report)?;
        Ok(())
    }
}
