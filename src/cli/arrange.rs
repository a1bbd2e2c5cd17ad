//! `arrange`: the layout of fasteners that meets a requirement.

mod keeping;
mod layouts;

use crate::{
    cli::{
        answers::{self, Answers, Form, Found},
        batch::Batch,
        chain::{Choice, Fineness},
        check,
        console::{Console, Outcome, Trouble},
        drawings,
        figure::Figure,
        input::{self, Source},
        output::{Existing, Permit, Target},
        shown::Shown,
    },
    figures::{ArrangePlot, Drawing, PlanShape},
    joint::{self, Joint},
    layout::{
        self, Answer, Defaults, Failure, Fasten, Goal, Row, Search, Size, Task, digest, rewritten,
    },
    report::{arrange, csv},
    units::System,
};
use clap::{Args, ValueEnum};
use keeping::Keeper;
use layouts::Layouts;
use std::{
    path::PathBuf,
    sync::{
        Arc,
        atomic::{AtomicBool, Ordering},
    },
};

const EXAMPLES: &str = "\
What may be tried stands in the [arrange] table of the joint file.
Examples:
  ringsum arrange joint.toml
  ringsum arrange joint.toml --for resistance --draw layouts.svg --write layouts
  ringsum arrange joints/*.toml --out found --jobs 2
  ringsum arrange joint.toml --checkpoint search.json    (later: --resume search.json)";

/// Memory that one elastic field may take, bytes.
const MEMORY: u64 = 1_000_000_000;
/// What a shell reports of a program that ended by Ctrl-C.
const INTERRUPTED: i32 = 130;

/// Search the layout of the first fastener group: fewest bolts, least mass or lowest resistance
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES)]
pub struct Arrange {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// What to make small: bolts, mass or resistance
    #[arg(
        long = "for",
        value_enum,
        value_name = "GOAL",
        default_value = "bolts",
        hide_possible_values = true
    )]
    goal: Wanted,
    /// How many of the best layouts are solved on the elastic field
    #[arg(long, value_name = "N", default_value_t = 8,
          value_parser = clap::value_parser!(u32).range(1..=200))]
    solve: u32,
    /// Seed of the random starts for free places
    #[arg(long, value_name = "N", default_value_t = 1)]
    seed: u64,
    #[command(flatten)]
    batch: Batch,
    #[command(flatten)]
    shown: Shown,
    /// Print one JSON object per file, in SI
    #[arg(long)]
    json: bool,
    /// Write one JSON per file and one table, layouts.csv, to a folder instead of printing
    #[arg(long, value_name = "DIR", conflicts_with = "json")]
    out: Option<PathBuf>,
    /// Draw the layouts of one joint to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    draw: Option<PathBuf>,
    /// Write a joint file for each layout of the front (marked *) into this folder, made if need be
    #[arg(long, value_name = "FOLDER")]
    write: Option<PathBuf>,
    /// Keep the state of the search in this file
    #[arg(long, value_name = "FILE")]
    checkpoint: Option<PathBuf>,
    /// Go on from this state
    #[arg(long, value_name = "FILE")]
    resume: Option<PathBuf>,
    /// Replace files that exist
    #[arg(long)]
    force: bool,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Wanted {
    /// Fewest bolts
    Bolts,
    /// Least mass of the fasteners
    Mass,
    /// Lowest resistance
    Resistance,
}

impl From<Wanted> for Goal {
    fn from(wanted: Wanted) -> Self {
        match wanted {
            Wanted::Bolts => Self::Bolts,
            Wanted::Mass => Self::Mass,
            Wanted::Resistance => Self::Resistance,
        }
    }
}

/// The joint that is searched, with all that is read for it.
#[derive(Clone, Copy)]
struct Read<'a> {
    source: &'a Source,
    joint: &'a Joint,
}

impl Read<'_> {
    /// Another layout of the same file, as the reader takes it.
    fn again(&self, text: &str) -> Result<Joint, String> {
        let files = |name: &str| input::table(&self.source.folder, name);
        joint::read_with_files(text, &[], &files).map_err(|told| told.first())
    }
}

impl Arrange {
    /// Searches every joint, prints the best, and tells by the exit code whether it was interrupted.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let read: Vec<PathBuf> = self.files.iter().chain(&self.resume).cloned().collect();
        let permit = Permit::new(self.force, &read);
        let figure = Figure::of_one(
            self.draw.as_deref(),
            self.files.len(),
            (permit, self.shown.system()),
        )?;
        let checkpoint = self.checkpoint()?;
        let layouts = match &self.write {
            Some(folder) => Some(Layouts::new(folder, &self.files, permit)?),
            None => None,
        };
        if figure.is_some() || layouts.is_some() || checkpoint.is_some() {
            console.outlast_reader();
        }
        let stop = stopped_by_keyboard()?;
        let form = Form {
            json: self.json,
            table: &csv::LAYOUTS,
            out: self.out.as_deref().map(|folder| (folder, permit)),
        };
        Answers::new(&self.batch, &self.files, &form)?.run(
            console,
            &|path, console| check::read(path, &[], console),
            &|(source, joint), console| {
                let read = Read { source, joint };
                if let Some(layouts) = &layouts {
                    layouts.check(read)?;
                }
                let mut keeper = Keeper::new(checkpoint.clone(), self.batch.watch());
                let answered = self.searched(read, (&stop, &mut keeper), console)?;
                let kept = keeper.kept();
                let drawn = figure
                    .as_ref()
                    .map_or(Ok(()), |figure| figure.write(&answered.plot(), console));
                let written = layouts.as_ref().map_or(Ok(()), |layouts| {
                    layouts.write(read, &answered.answer, console)
                });
                Ok(Found {
                    answer: Box::new(answered),
                    unwritten: [kept, drawn, written]
                        .into_iter()
                        .filter_map(Result::err)
                        .collect(),
                })
            },
        )
    }

    /// The search of one joint, up to its end or to Ctrl-C.
    fn searched(
        &self,
        read: Read,
        (stop, keeper): (&AtomicBool, &mut Keeper),
        console: &mut Console,
    ) -> Result<Answered, Trouble> {
        let task = Task {
            goal: self.goal.into(),
            solve: self.solve as usize,
            seed: self.seed,
            choice: Choice::elastic(Fineness::Fast, MEMORY),
        };
        let mut state = keeping::state(self.resume.as_deref(), &self.digest(read))?;
        let arrange = read.joint.arrange.clone().unwrap_or_default();
        let defaults = Defaults::of(read.joint, &arrange);
        let sizes = sizes((read, &arrange), task.goal, console)?;
        let search = Search::new(task, &arrange, &sizes)?;
        let ended = search.run(&mut state, stop, &mut |state, progress| {
            keeper.note(state, progress);
        });
        keeper.last(&state);
        let answer = Answer::of(&search, &state, ended.is_ok());
        Ok(Answered {
            plates: read
                .joint
                .plates
                .iter()
                .map(|plate| drawings::outline(plate).shape)
                .collect(),
            keep_out: arrange
                .keep_out
                .iter()
                .filter_map(|zone| drawings::heated(*zone))
                .collect(),
            heads: heads(&search, &answer),
            answer,
            defaults,
            system: self.shown.system(),
        })
    }

    /// What a checkpoint must have been made of.
    fn digest(&self, read: Read) -> String {
        digest(&[
            env!("CARGO_PKG_VERSION"),
            &read.source.text,
            // Tables that the file names are part of the joint as read.
            &format!("{:?}", read.joint),
            Goal::from(self.goal).name(),
            &self.solve.to_string(),
            &self.seed.to_string(),
        ])
    }

    /// Where the state goes; the file that is resumed may be replaced.
    fn checkpoint(&self) -> Result<Option<PathBuf>, Trouble> {
        let Some(path) = self.checkpoint.as_ref().or(self.resume.as_ref()) else {
            return Ok(None);
        };
        if self.files.len() > 1 {
            let count = self.files.len();
            return Err(Trouble::usage(
                format!("a checkpoint keeps one search, and {count} joints are named"),
                "search them one by one where they shall be resumed",
            ));
        }
        if self.resume.as_ref() == Some(path) {
            Target::new(path, Existing::Replace)?;
        } else {
            Permit::new(self.force, &self.files).target(path)?;
        }
        Ok(Some(path.clone()))
    }
}

/// A search that ended or was stopped, with what its drawing needs of the joint.
struct Answered {
    answer: Answer,
    defaults: Defaults,
    plates: Vec<PlanShape>,
    keep_out: Vec<PlanShape>,
    heads: Vec<f64>,
    /// The units of its text.
    system: System,
}

impl Answered {
    fn plot(&self) -> Drawing {
        Drawing::Arrange(Box::new(ArrangePlot {
            answer: self.answer.clone(),
            plates: self.plates.clone(),
            keep_out: self.keep_out.clone(),
            heads: self.heads.clone(),
        }))
    }
}

impl answers::Answer for Answered {
    fn text(&self) -> String {
        arrange::answer_in(&self.answer, &self.defaults, self.system)
    }

    fn object(&self) -> serde_json::Value {
        arrange::json(&self.answer, &self.defaults)
    }

    fn rows(&self) -> Vec<Vec<String>> {
        csv::layouts(&self.answer)
    }

    fn outcome(&self) -> Outcome {
        if self.answer.complete {
            Outcome::Done
        } else {
            Outcome::Interrupted
        }
    }
}

/// Radius of the head of each row, m.
fn heads(search: &Search, answer: &Answer) -> Vec<f64> {
    let head = |row: &Row| {
        let size = search.sizes.iter().find(|size| size.index == row.size);
        size.map_or(0.0, |size| size.fastener().head_seat.outer_radius)
    };
    answer.rows.iter().map(head).collect()
}

/// The sizes that bear their torque, in the case in which the joint as stated stands worst; the others
/// are named.
fn sizes(
    (read, arrange): (Read, &joint::Arrange),
    goal: Goal,
    console: &mut Console,
) -> Result<Vec<Size>, Trouble> {
    let target = layout::Target::of(read.joint, goal)?;
    let places = &read.joint.fasteners[0].places;
    let case = layout::worst_case((read.joint, places), &target)?;
    let tried: Vec<Option<usize>> = match arrange.sizes {
        0 => vec![None],
        count => (0..count).map(Some).collect(),
    };
    let mut sizes = Vec::new();
    let mut over = Vec::new();
    for index in tried {
        let size = Size::in_case(index, alone(read, index)?, case)?;
        match &size.overstressed {
            Some(why) => over.push(why.clone()),
            None => sizes.push(size),
        }
    }
    if sizes.is_empty() {
        return Err(Failure::Overstressed(over.join("; ")).into());
    }
    for why in over {
        console.message(&format!("left out, overstressed: {why}\n"));
    }
    Ok(sizes)
}

/// The joint with one fastener of a size, at the first of its places that takes it.
fn alone(read: Read, size: Option<usize>) -> Result<Joint, Failure> {
    let mut told = String::new();
    for place in &read.joint.fasteners[0].places {
        let places = [*place];
        let fasten = Fasten {
            size,
            places: &places,
        };
        match read.again(&rewritten(&read.source.text, fasten)?) {
            Ok(joint) => return Ok(joint),
            Err(fault) => told = fault,
        }
    }
    Err(Failure::Size {
        size: size.map_or_else(
            || "the fastener".to_owned(),
            |size| format!("arrange.sizes[{}]", size + 1),
        ),
        fault: told,
    })
}

impl From<Failure> for Trouble {
    fn from(failure: Failure) -> Self {
        let help = match &failure {
            Failure::Chain(_) | Failure::NoPath | Failure::Rewriting(_) => {
                return Self::Failure(failure.to_string());
            }
            Failure::NoRequirement => {
                "state `require = { rise = \"10 K\" }` in [service], or ask `--for resistance`"
            }
            Failure::NoHeat => "state `heat` in [service]",
            Failure::FromCoolant => {
                "take the drop from sink surface to coolant, which `estimate` tells, off the limit, and leave `above` out"
            }
            Failure::Size { .. } => {
                "state what differs from the first fastener group: thread, hole, torque"
            }
            Failure::Overstressed(_) => {
                "lower the torque, put washers under head and nut, or allow stronger fasteners in arrange.sizes"
            }
            Failure::NoLayout(_) => {
                "allow other numbers of bolts, smaller sizes or distances in [arrange]"
            }
        };
        Self::usage(failure.to_string(), help)
    }
}

/// Set by Ctrl-C; a second one ends at once.
fn stopped_by_keyboard() -> Result<Arc<AtomicBool>, Trouble> {
    let stop = Arc::new(AtomicBool::new(false));
    let asked = stop.clone();
    ctrlc::set_handler(move || {
        if asked.swap(true, Ordering::Relaxed) {
            std::process::exit(INTERRUPTED);
        }
    })
    .map_err(|fault| Trouble::Failure(fault.to_string()))?;
    Ok(stop)
}
