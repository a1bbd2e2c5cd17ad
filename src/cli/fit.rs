//! `fit`: own measurements to a law with its scatter, or to one unknown of a joint.

use crate::{
    cli::{
        batch::Batch,
        check,
        console::{Console, Layout, Outcome, Trouble},
        field::{self, Field},
        figure::Figure,
        input::{self, Source},
        output::{Permit, Target},
        results,
        shown::Shown,
    },
    diagnostic::{
        self, Caution, Colour, Fault,
        registry::{Gravity, gravity},
    },
    figures::{Drawing, FitPlot, ProfilePlot},
    fit::{
        Direction, Readings, Series,
        block::block,
        series::Form,
        unknown::{self, Answer, Bench, Question, WORDS},
    },
    joint::{self, Plane},
    report::{fit, listing, text},
};
use clap::{Args, ValueEnum};
use std::{
    fmt::Write,
    path::{Path, PathBuf},
};

const EXAMPLES: &str = "\
The table has a heading with quantities and units and one reading per line:
  pressure [MPa], h [W/(m²·K)], sigma [%], direction, specimen
Varied: pressure, force (of one bolt) or torque. Measured: h or R of a face, W/K or K/W.
sigma, direction (loading, unloading) and specimen may be left out.

Examples:
  ringsum fit rig.csv
  ringsum fit rig.csv --as table --out measured.toml
  ringsum fit joint.toml points.csv --unknown roughness
  ringsum fit joint.toml points.csv --unknown plate.lid.bow --from \"0 µm\" --to \"60 µm\"";

/// Fit own measurements: a law with its scatter for `[measured]`, or one unknown of a joint
///
/// Without --unknown a power law is laid through the readings and printed as a `[measured]` block.
/// With it the joint's model is held against readings of its conductance.
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES, mut_group("Field", |group| group.requires("unknown")))]
pub struct Fit {
    /// Tables of readings, each fitted alone; after a joint file where --unknown asks for one; - reads
    /// standard input
    #[arg(required_unless_present = "unknown", value_name = "FILE")]
    files: Vec<PathBuf>,
    /// What is laid through the readings
    #[arg(
        long = "as",
        value_enum,
        value_name = "law|table",
        hide_possible_values = true,
        conflicts_with = "unknown"
    )]
    form: Option<Shape>,
    /// Leave out the reading on this line of the table; may be given again
    #[arg(long, value_name = "LINE")]
    without: Vec<usize>,
    /// Branch that is written as a block, where both were measured [default: loading]
    #[arg(
        long,
        value_enum,
        value_name = "loading|unloading",
        hide_possible_values = true,
        conflicts_with = "unknown"
    )]
    branch: Option<Way>,
    /// Bolts that shared the measured W/K; the block is for one
    #[arg(long, value_name = "N", default_value_t = 1, conflicts_with = "unknown",
          value_parser = clap::value_parser!(u32).range(1..=10_000))]
    bolts: u32,
    /// The unknown: a field as --set names it, or a word (--unknown list tells them)
    #[arg(long, value_name = "FIELD")]
    unknown: Option<String>,
    /// Least value of the unknown, with its unit
    #[arg(
        long,
        value_name = "VALUE",
        requires = "unknown",
        allow_hyphen_values = true
    )]
    from: Option<String>,
    /// Largest value of the unknown
    #[arg(
        long,
        value_name = "VALUE",
        requires = "unknown",
        allow_hyphen_values = true
    )]
    to: Option<String>,
    /// Planes of the readings: contact, node-to-node, added or source-to-sink (default)
    #[arg(
        long,
        value_enum,
        value_name = "PLANES",
        hide_possible_values = true,
        requires = "unknown"
    )]
    planes: Option<Planes>,
    /// Thermal case of the joint in which was measured, counted from 1 in file order
    #[arg(long, value_name = "N", default_value_t = 1, requires = "unknown",
          value_parser = clap::value_parser!(u32).range(1..=2))]
    case: u32,
    #[command(flatten)]
    field: Field,
    /// Joints drawn for what other inputs leave open; 0 takes these as nominal
    #[arg(long, value_name = "N", default_value_t = 256, requires = "unknown", value_parser = draws)]
    draws: u32,
    /// Seed of the draws
    #[arg(long, value_name = "N", default_value_t = 1, requires = "unknown")]
    seed: u64,
    #[command(flatten)]
    shown: Shown,
    /// Override a field of the joint: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE", requires = "unknown")]
    sets: Vec<String>,
    #[command(flatten)]
    batch: Batch,
    /// Write the `[measured]` block to a file; of several tables the blocks to a folder
    #[arg(long, value_name = "FILE", conflicts_with = "unknown")]
    out: Option<PathBuf>,
    /// Draw readings and law, or the likelihood, to a file that ends in .svg or .png
    #[arg(long, value_name = "FIGURE")]
    draw: Option<PathBuf>,
    /// Replace files that exist
    #[arg(long)]
    force: bool,
    /// Print one JSON object per table, in SI
    #[arg(long)]
    json: bool,
    /// Exit with 3 when a caution speaks of this fit
    #[arg(long)]
    strict: bool,
}

/// What is laid through readings.
#[derive(Clone, Copy, Debug, ValueEnum)]
enum Shape {
    /// A power law
    Law,
    /// A table that never falls
    Table,
}

/// Direction of load.
#[derive(Clone, Copy, Debug, ValueEnum)]
enum Way {
    /// Rising
    Loading,
    /// Falling
    Unloading,
}

/// Planes between which was measured.
#[derive(Clone, Copy, Debug, ValueEnum)]
enum Planes {
    /// The faying faces alone
    Contact,
    /// Means of the plates
    NodeToNode,
    /// What the joint adds
    Added,
    /// Heated zone to sink surface
    SourceToSink,
}

/// Fewest draws that tell a covariance.
const FEWEST: u32 = 32;
/// Most draws kept at once.
const MOST: u32 = 65_536;

fn draws(text: &str) -> Result<u32, String> {
    match text.parse::<u32>() {
        Ok(count) if count == 0 || (FEWEST..=MOST).contains(&count) => Ok(count),
        _ => Err(format!("draws are 0 or from {FEWEST} to {MOST}")),
    }
}

impl Fit {
    /// Fits every table; checks every file to be written before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        if self.unknown.as_deref() == Some("list") {
            console.result(&words())?;
            return Ok(Outcome::Done);
        }
        input::stdin_at_most_once(&self.files)?;
        // What is written where depends on the tables that are named, not on the part of this run.
        let named = self.tables()?;
        let several = named.len() > 1;
        let tables = self.batch.files(named);
        let permit = Permit::new(self.force, &self.files);
        let figure = Figure::of_one(
            self.draw.as_deref(),
            named.len(),
            (permit, self.shown.system()),
        )?;
        if several && !self.without.is_empty() {
            return Err(Trouble::usage(
                format!(
                    "--without counts the lines of one table, and {} are named",
                    named.len()
                ),
                "fit the table with a line to leave out alone",
            ));
        }
        let blocks = self.blocks(named, &tables, permit)?;
        if figure.is_some() || !blocks.is_empty() {
            console.outlast_reader();
        }
        self.batch.run(&tables, console, &|index, path, console| {
            if several && !self.json {
                let gap = if index > 0 { "\n" } else { "" };
                console.result(&format!("{gap}{}:\n", input::name(path)))?;
            }
            let done = match &self.unknown {
                None => self.law(path, (blocks.get(index), figure.as_ref()), console),
                Some(asked) => {
                    let files = [self.files[0].as_path(), path];
                    self.unknown(asked, files, figure.as_ref(), console)
                }
            };
            if let (true, Some(why)) = (self.json, done.as_ref().err().and_then(Trouble::sentence))
            {
                let object = listing::unanswered(&input::name(path), why);
                console.json_of_failure(&object, self.layout());
            }
            done
        })
    }

    /// The tables among the files; where an unknown is asked for, a joint comes before them.
    fn tables(&self) -> Result<&[PathBuf], Trouble> {
        match (&self.unknown, self.files.as_slice()) {
            (Some(_), [joint, tables @ ..])
                if !is_joint(joint) && tables.iter().any(|table| is_joint(table)) =>
            {
                Err(Trouble::usage(
                    format!(
                        "`{}` stands where the joint file belongs",
                        input::name(joint)
                    ),
                    "name the joint file first, and the table of readings after it",
                ))
            }
            (Some(_), [_joint, tables @ ..]) if !tables.is_empty() => Ok(tables),
            (Some(_), _) => Err(Trouble::usage(
                "an unknown takes a joint file and a table of what it conducted",
                "name the joint file before the table: `ringsum fit joint.toml points.csv --unknown roughness`",
            )),
            (None, tables) => match tables.iter().find(|table| is_joint(table)) {
                Some(joint) => Err(Trouble::usage(
                    format!(
                        "`{}` is a joint file, and no unknown of it is asked for",
                        input::name(joint)
                    ),
                    format!(
                        "name the joint, a table of readings and what is unknown: --unknown with one of {}",
                        listed()
                    ),
                )),
                None => Ok(tables),
            },
        }
    }

    /// Where the blocks are written: into a file, or of several tables into a folder.
    fn blocks(
        &self,
        named: &[PathBuf],
        tables: &[PathBuf],
        permit: Permit,
    ) -> Result<Vec<Target>, Trouble> {
        match (&self.out, named) {
            (None, _) => Ok(Vec::new()),
            (Some(file), [_]) => tables.iter().map(|_| permit.target(file)).collect(),
            (Some(folder), _) => {
                results::apart(named, ".toml")?;
                results::make(folder)?;
                let name = |path: &PathBuf| format!("{}.toml", results::stem(path));
                let target = |path| permit.target(&folder.join(name(path)));
                tables.iter().map(target).collect()
            }
        }
    }

    fn layout(&self) -> Layout {
        Layout::of_batch(self.files.len() - usize::from(self.unknown.is_some()))
    }

    fn law(
        &self,
        points: &Path,
        (out, figure): (Option<&Target>, Option<&Figure>),
        console: &mut Console,
    ) -> Result<Outcome, Trouble> {
        let (source, readings) = self.readings(points, self.json, console)?;
        let form = match self.form {
            None | Some(Shape::Law) => Form::Law,
            Some(Shape::Table) => Form::Table,
        };
        let series = Series::of(&readings, form)
            .map_err(|found| Trouble::usage(format!("{}: {found}", source.name), found.help()))?;
        let branch = series.branch(self.branch.map(|way| match way {
            Way::Loading => Direction::Loading,
            Way::Unloading => Direction::Unloading,
        }));
        let Some(branch) = branch else {
            return Err(Trouble::usage(
                format!("{} holds no such branch", source.name),
                "a column `direction` tells loading from unloading",
            ));
        };
        let block = block(&series, branch, self.bolts);
        let drawn = figure.map_or(Ok(()), |figure| {
            let plot = FitPlot {
                title: stem(&source.name),
                series: series.clone(),
            };
            figure.write(&Drawing::Fit(Box::new(plot)), console)
        });
        let kept = out.map_or(Ok(()), |target| {
            target.write(block.as_bytes())?;
            console.wrote(&target.path);
            Ok(())
        });
        let outcome = self.outcome(&series.cautions, [drawn, kept], console);
        if self.json {
            console.json(
                &fit::series_json(&series, (&source.name, &block)),
                self.layout(),
            )?;
        } else {
            let mut text =
                text::painted(&fit::series_in(&series, &source.name, self.shown.system()));
            if out.is_none() {
                let _ = write!(text, "\n{block}");
            }
            console.result(&text)?;
        }
        Ok(outcome)
    }

    fn unknown(
        &self,
        asked: &str,
        [joint, points]: [&Path; 2],
        figure: Option<&Figure>,
        console: &mut Console,
    ) -> Result<Outcome, Trouble> {
        let choice = self.field.choice()?;
        // Both files are read before anything is solved, so that all their faults are told.
        let read = check::read(joint, &self.sets, console);
        // One object for a table: the faults of the joint come first.
        let points = self.readings(points, self.json && read.is_ok(), console);
        let (file, _) = match read {
            Ok(read) => read,
            Err(refused) => {
                if self.json {
                    console.json_of_failure(&refused.json(), self.layout());
                }
                if let Err(unread) = points {
                    console.trouble(&unread);
                }
                return Err(refused.trouble());
            }
        };
        let (source, readings) = points?;
        let folder = input::folder(joint);
        let reader = |more: &[String]| {
            let sets: Vec<String> = self.sets.iter().chain(more).cloned().collect();
            joint::read_with_files(&file.text, &sets, &|name| input::table(&folder, name))
                .map_err(|faults| faults.shown(&file.name, Colour::Ansi) + "\n")
        };
        let bench = Bench {
            reader: &reader,
            choice,
            watch: field::watch(),
            case: self.case as usize - 1,
        };
        let (unknown, range) = bench.unknown(asked, [self.from.as_deref(), self.to.as_deref()])?;
        let question = Question {
            unknown,
            range,
            plane: match self.planes {
                Some(Planes::Contact) => Plane::Contact,
                Some(Planes::NodeToNode) => Plane::NodeToNode,
                Some(Planes::Added) => Plane::AddedByJoint,
                Some(Planes::SourceToSink) | None => Plane::SourceToSink,
            },
            draws: self.draws,
            seed: self.seed,
        };
        let answer = unknown::fit(&bench, &question, &readings);
        bench.watch.tell("");
        let answer = match answer {
            Ok(answer) => answer,
            Err(failure) => {
                if let (true, unknown::Failure::Refused(_)) = (self.json, &failure) {
                    let why = "the joint is refused at a value of the unknown that is tried";
                    let object = listing::unanswered(&source.name, why);
                    console.json_of_failure(&object, self.layout());
                }
                return Err(failure.into());
            }
        };
        let drawn = figure.map_or(Ok(()), |figure| {
            let plot = ProfilePlot {
                asked: question.clone(),
                answer: answer.clone(),
            };
            figure.write(&Drawing::Profile(Box::new(plot)), console)
        });
        let outcome = self.outcome(&answer.cautions, [drawn], console);
        self.tell((&question, &answer), &source, console)?;
        Ok(outcome)
    }

    fn tell(
        &self,
        (question, answer): (&Question, &Answer),
        source: &Source,
        console: &mut Console,
    ) -> Result<(), Trouble> {
        if self.json {
            console.json(
                &fit::answer_json(question, answer, &source.name),
                self.layout(),
            )?;
        } else {
            let shown = (source.name.as_str(), self.shown.system());
            console.result(&text::painted(&fit::answer_in(question, answer, shown)))?;
        }
        Ok(())
    }

    /// The readings of a table, those left out told; its faults also `as_json`.
    fn readings(
        &self,
        path: &Path,
        as_json: bool,
        console: &mut Console,
    ) -> Result<(Source, Readings), Trouble> {
        let source = input::points(path)?;
        let all = match Readings::read(&source.text) {
            Ok(all) => all,
            Err(faults) => {
                if as_json {
                    console.json_of_failure(&refused_json(&source, &faults), self.layout());
                }
                return Err(refused(&source, &faults));
            }
        };
        let (kept, strange) = all.without(&self.without);
        if let Some(line) = strange.first() {
            return Err(Trouble::usage(
                format!("line {line} of {} holds no reading", source.name),
                "lines are counted from 1, the heading and comments with them",
            ));
        }
        if kept.rows.is_empty() {
            return Err(Trouble::usage("every reading is left out", "leave some in"));
        }
        if !self.without.is_empty() {
            let mut lines = self.without.clone();
            lines.sort_unstable();
            lines.dedup();
            let lines: Vec<String> = lines.iter().map(usize::to_string).collect();
            console.message(&format!(
                "left out as told: line {} of {}\n",
                lines.join(", "),
                source.name
            ));
        }
        Ok((source, kept))
    }

    /// How a fit ends, which is told even where a file of it could not be written.
    fn outcome<const N: usize>(
        &self,
        cautions: &[Caution],
        written: [Result<(), Trouble>; N],
        console: &mut Console,
    ) -> Outcome {
        let unwritten: Vec<Trouble> = written.into_iter().filter_map(Result::err).collect();
        for trouble in &unwritten {
            console.trouble(trouble);
        }
        if !unwritten.is_empty() {
            return Outcome::Failed;
        }
        let speaks = |caution: &Caution| gravity(caution.code) != Gravity::Standing;
        if self.strict && cautions.iter().any(speaks) {
            Outcome::Cautioned
        } else {
            Outcome::Done
        }
    }
}

impl From<unknown::Failure> for Trouble {
    fn from(failure: unknown::Failure) -> Self {
        match failure {
            unknown::Failure::Refused(drawn) => Self::Faults(drawn),
            unknown::Failure::Chain(failure) => failure.into(),
            unknown::Failure::Question { message, help } => Self::usage(message, help),
            unknown::Failure::Likelihood(_) => Self::Failure(failure.to_string()),
        }
    }
}

/// The faults of a table drawn into its text.
fn refused(source: &Source, faults: &[Fault]) -> Trouble {
    let drawn: Vec<String> = faults
        .iter()
        .map(|fault| diagnostic::shown(fault, &source.name, &source.text, Colour::Ansi))
        .collect();
    let mut text = drawn.join("\n\n");
    text.push('\n');
    if faults.len() > 1 {
        let _ = writeln!(text, "\n{} faults in {}", faults.len(), source.name);
    }
    Trouble::Faults(text)
}

fn refused_json(source: &Source, faults: &[Fault]) -> serde_json::Value {
    let faults = joint::Faults {
        sources: vec![(String::new(), source.text.clone())],
        faults: faults.iter().map(|fault| (0, fault.clone())).collect(),
    };
    listing::faults(&source.name, &faults)
}

/// Whether a path is that of a joint file by its ending.
fn is_joint(path: &Path) -> bool {
    path.extension().is_some_and(|ending| ending == "toml")
}

fn stem(name: &str) -> String {
    let stem = Path::new(name).file_stem().and_then(|stem| stem.to_str());
    stem.unwrap_or(name).replace('_', " ")
}

fn listed() -> String {
    let words: Vec<&str> = WORDS.iter().map(|word| word.name).collect();
    words.join(", ")
}

/// What may be unknown.
fn words() -> String {
    let mut text = String::new();
    for word in WORDS {
        let _ = writeln!(text, "{:<20} {}{}", word.name, word.meaning, word.between());
    }
    text.push_str(
        "any field            of the joint file as --set names it, with --from and --to\n",
    );
    text
}
