//! `compare`: several joints, or the variants of one, in one table.

use crate::{
    cli::{
        chain::{self, Choice, Entry, Losses},
        check,
        console::{Console, Layout, Outcome, Trouble},
        drawings,
        draws::Draws,
        field::{self, Field},
        figure::Figure,
        input,
        output::Permit,
        results::stem,
        shown::Shown,
    },
    estimate::FieldMap,
    figures::{ComparisonPlot, ComparisonRow, Drawing},
    joint::Version,
    report::{comparison, json, listing, number::brief},
    uncertainty::{Compared, Comparison, Sense},
};
use clap::Args;
use std::path::{Path, PathBuf};

const EXAMPLES: &str = "\
Examples:
  ringsum compare joint.toml                         the joint and its [[variant]] tables
  ringsum compare four_bolts.toml eight_bolts.toml
  ringsum compare joints/*.toml --field cone --draw joints.svg";

/// Points across a small map.
const COLUMNS: usize = 160;
/// Name of the joint as stated beside its variants.
const STATED: &str = "as stated";

/// Joints, or the variants of one, in one table: results, strength, mass, a lost bolt, and whether
/// the choice matters
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a flag of its own on the command line"
)]
pub struct Compare {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    #[command(flatten)]
    field: Field,
    #[command(flatten)]
    draws: Draws,
    /// Override a field in every joint: --set 'service.medium="air"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Leave out what the loss of a bolt would cost
    #[arg(long)]
    no_loss: bool,
    #[command(flatten)]
    shown: Shown,
    /// Print JSON, in SI
    #[arg(long)]
    json: bool,
    /// Exit with 3 when a caution speaks of one of the joints
    #[arg(long)]
    strict: bool,
    /// Draw the bands and pressures to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    draw: Option<PathBuf>,
    /// Replace the figure if it exists
    #[arg(long)]
    force: bool,
}

impl Compare {
    /// Reads every file with its variants, tells all faults, then compares.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        input::stdin_at_most_once(&self.files)?;
        let permit = Permit::new(self.force, &self.files);
        let figure = Figure::asked(self.draw.as_deref(), (permit, self.shown.system()))?;
        if figure.is_some() {
            console.outlast_reader();
        }
        let choice = self.field.choice()?;
        let Some(entries) = self.entries(console) else {
            return Ok(Outcome::Faulty);
        };
        let (found, maps) = match self.compared(&entries, (choice, figure.is_some())) {
            Ok(found) => found,
            Err(trouble) => {
                if let (true, Some(why)) = (self.json, trouble.sentence()) {
                    let files: Vec<String> =
                        self.files.iter().map(|path| input::name(path)).collect();
                    let object = listing::unanswered(&files.join(", "), why);
                    console.json_of_failure(&object, Layout::Indented);
                }
                return Err(trouble);
            }
        };
        let written = figure.map_or(Ok(()), |figure| {
            let plot = plot(&entries, (&found, &maps));
            figure.write(&Drawing::Comparison(Box::new(plot)), console)
        });
        let outcome = match written {
            Ok(()) => self.outcome(&found),
            // The comparison is told even so.
            Err(trouble) => {
                console.trouble(&trouble);
                trouble.outcome()
            }
        };
        if self.json {
            console.json(&json::comparison(&found), Layout::Indented)?;
        } else {
            console.result(&comparison::comparison_in(&found, self.shown.system()))?;
        }
        Ok(outcome)
    }

    fn outcome(&self, found: &Comparison) -> Outcome {
        let mut joints = found.joints.iter();
        if self.strict && joints.any(|joint| joint.estimate.has_cautions()) {
            Outcome::Cautioned
        } else {
            Outcome::Done
        }
    }

    fn compared(
        &self,
        entries: &[Entry],
        (choice, drawn): (Choice, bool),
    ) -> Result<(Comparison, Vec<FieldMap>), Trouble> {
        if entries.len() < 2 {
            return Err(Trouble::usage(
                "there is only one joint, and a comparison needs two",
                "name several files, or add `[[variant]]` tables with a name and what differs",
            ));
        }
        let losses = if self.no_loss {
            Losses::Left
        } else {
            Losses::Weighed
        };
        let asked = (&self.draws.options(), losses, drawn.then_some(COLUMNS));
        chain::compared(entries, (choice, &field::watch()), asked)
    }

    /// Every joint of every file; none where a file is at fault, after all were read.
    fn entries(&self, console: &mut Console) -> Option<Vec<Entry>> {
        let mut entries = Vec::new();
        let mut sound = true;
        for path in &self.files {
            match check::read_versions(path, &self.sets, console) {
                Ok((_, versions)) => {
                    let file = self.name(path);
                    entries.extend(versions_of(file.as_deref(), versions));
                }
                Err(refused) => {
                    sound = false;
                    if self.json {
                        console
                            .json_of_failure(&refused.json(), Layout::of_batch(self.files.len()));
                    }
                    console.trouble(&refused.trouble());
                }
            }
        }
        sound.then_some(entries)
    }

    /// What a file is called in the tables: none where it is the only one.
    fn name(&self, path: &Path) -> Option<String> {
        let own = stem(path);
        let alike = self.files.iter().filter(|other| stem(other) == own);
        match (self.files.len(), alike.count()) {
            (1, _) => None,
            (_, 1) => Some(own),
            _ => Some(input::name(path)),
        }
    }
}

/// The joint of a file and its variants, each with its name.
pub(super) fn versions_of(
    file: Option<&str>,
    versions: Vec<Version>,
) -> impl Iterator<Item = Entry> {
    let alone = versions.len() == 1;
    versions.into_iter().map(move |version| {
        let own = match (&version.name, alone) {
            (Some(name), _) => Some(name.as_str()),
            (None, false) => Some(STATED),
            (None, true) => None,
        };
        Entry {
            name: match (file, own) {
                (Some(file), Some(own)) => format!("{file}: {own}"),
                (Some(file), None) => file.to_owned(),
                (None, own) => own.unwrap_or(STATED).to_owned(),
            },
            joint: version.joint,
        }
    })
}

/// Versions side by side, with their pressures.
pub(super) fn plot(entries: &[Entry], (found, maps): (&Comparison, &[FieldMap])) -> ComparisonPlot {
    let rows = found
        .joints
        .iter()
        .zip(entries)
        .zip(maps)
        .enumerate()
        .filter_map(|(index, ((joint, entry), map))| {
            let case = joint.estimate.cases.get(joint.case)?;
            Some(ComparisonRow {
                name: joint.name.clone(),
                notes: notes(joint),
                band: case.results.source_to_sink.resistance,
                best: index == found.best,
                pressure: drawings::pressure(&entry.joint, &joint.estimate, map),
            })
        });
    let first = &found.joints[0];
    let titles: Vec<&str> = entries
        .iter()
        .map(|entry| entry.joint.title.as_str())
        .collect();
    let one = titles.iter().all(|title| *title == titles[0]);
    ComparisonPlot {
        title: if one {
            titles[0].to_owned()
        } else {
            format!("{} joints side by side", entries.len())
        },
        subtitle: format!(
            "source to sink and contact pressure, field {}, {}; {} is best",
            first.estimate.field,
            first.estimate.resolution,
            match found.sense {
                Sense::Pass => "the least",
                Sense::Resist => "the largest",
            }
        ),
        rows: rows.collect(),
        required: found.required,
    }
}

/// What stands below a name: bolts, mass, odds.
fn notes(joint: &Compared) -> Vec<String> {
    let ending = if joint.bolts == 1 { "" } else { "s" };
    let mut lines = vec![format!(
        "{} bolt{ending}, {} kg",
        joint.bolts,
        brief(joint.mass.total())
    )];
    if let Some(odds) = joint.odds {
        lines.push(format!("best is better in {:.0} of 100", 100.0 * odds));
    }
    lines
}
